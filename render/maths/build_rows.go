package maths

import (
	"math"
	"slices"

	"gusset/notebook/check"
	"gusset/notebook/syntax"
)

// Of many terms the first ones and the last are written out.
const (
	allTerms   = 4
	firstTerms = 2
)

// reduction sets sum, mean, min, max, count and extreme over rows. With values
// the terms are written out, all of a few, else the first and the last, and
// the one that decides.
func (w *builder) reduction(c *syntax.Call) (Node, rank) {
	arg := c.Args[0]
	rows := w.reduced(arg)
	var name Node = word(c.Fun.ID)
	if arg.Over != nil {
		name = Script{Base: name, Sub: Text{Text: arg.Over.Text}}
	} else if c.Fun.ID == "sum" && len(rows) == 1 {
		name = Script{Base: name, Sub: Text{Text: rows[0].Name}}
	}
	if !w.values || len(rows) != 1 || rows[0].N() == 0 || c.Fun.ID == "count" {
		at := w.at
		w.at = slices.DeleteFunc(slices.Clone(at), func(p place) bool { return slices.Contains(rows, p.rows) })
		inside := w.side(arg.Value)
		w.at = at
		return Call(name, inside), rankedAtom
	}
	n := rows[0].N()
	governs := w.decides(c, rows[0])
	least, first := rankedProduct, false
	if c.Fun.ID != "sum" {
		least, first = rankedOr, true
	}
	var terms []Node
	skipped := false
	for i := range n {
		if n > allTerms && i >= firstTerms && i < n-1 && i != governs {
			skipped = true
			continue
		}
		if skipped {
			terms = append(terms, Text{Text: "…"})
			skipped = false
		}
		w.at = append(w.at, place{rows[0], i})
		t := w.part(arg.Value, least, first || i == 0)
		w.at = w.at[:len(w.at)-1]
		if i == governs {
			t = governing(t)
		}
		terms = append(terms, t)
	}
	if c.Fun.ID != "sum" {
		return Call(name, terms...), rankedAtom
	}
	sum := make(Row, 0, 2*len(terms))
	for i, t := range terms {
		if i > 0 {
			sum = append(sum, Plus)
		}
		sum = append(sum, t)
	}
	if len(terms) == 1 {
		return sum, rankedProduct
	}
	return sum, rankedSum
}

// decides is the row that min, max or extreme takes, -1 where that is not at hand.
func (w *builder) decides(c *syntax.Call, rows *check.Rows) int {
	at, best := -1, 0.0
	if c.Fun.ID == "sum" || c.Fun.ID == "mean" {
		return -1
	}
	for i := range rows.N() {
		w.at = append(w.at, place{rows, i})
		v, ok := w.amount(c.Args[0].Value)
		w.at = w.at[:len(w.at)-1]
		if !ok || v-v != 0 {
			return -1
		}
		if at < 0 || beyond(c.Fun.ID, v, best) {
			at, best = i, v
		}
	}
	return at
}

// amount is the value of a term that is made of names and literals.
func (w *builder) amount(e syntax.Expr) (float64, bool) {
	switch e := unbracketed(e).(type) {
	case *syntax.Unary:
		x, ok := w.amount(e.X)
		return -x, ok && e.Op == syntax.Neg
	case *syntax.Binary:
		x, left := w.amount(e.X)
		y, right := w.amount(e.Y)
		ok := left && right
		switch e.Op {
		case syntax.Add:
			return x + y, ok
		case syntax.Sub:
			return x - y, ok
		case syntax.Mul:
			return x * y, ok
		case syntax.Div:
			return x / y, ok
		case syntax.Pow:
			return math.Pow(x, y), ok
		}
		return 0, false
	case *syntax.Call:
		if w.functions[e.Fun.ID] != nil || len(e.Args) == 0 {
			return 0, false
		}
		x, ok := w.amount(e.Args[0].Value)
		switch {
		case e.Fun.ID == "abs":
			return math.Abs(x), ok
		case e.Fun.ID == "sqrt":
			return math.Sqrt(x), ok
		case e.Fun.ID == "hypot" && len(e.Args) == 2:
			y, second := w.amount(e.Args[1].Value)
			return math.Hypot(x, y), ok && second
		}
		return 0, false
	}
	return w.number(e)
}

// beyond tells that a value decides rather than one before it; of equal ones,
// but for the last bits, the first does.
func beyond(function string, v, best float64) bool {
	if math.Abs(v-best) <= 1e-9*max(math.Abs(v), math.Abs(best)) {
		return false
	}
	switch function {
	case "min":
		return v < best
	case "max":
		return v > best
	}
	return max(v, -v) > max(best, -best)
}

// reduced is the sets of rows that a reduction takes in: the one named behind
// over, else all those of the argument. One may stand outside of the reduction
// too, at the row being written out: x/sum(x).
func (w *builder) reduced(a syntax.Arg) []*check.Rows {
	var rows []*check.Rows
	for _, r := range w.rowsOf(nil, a.Value) {
		if a.Over == nil || w.named(r, a.Over) {
			rows = append(rows, r)
		}
	}
	return rows
}

// named tells whether a set of rows is the one that a name behind over means.
func (w *builder) named(r *check.Rows, over *syntax.Name) bool {
	if s := w.used(over); s != nil {
		for _, o := range s.Value.Type.Rows {
			if o == r {
				return true
			}
		}
		return false
	}
	name := over.ID
	for i := len(name) - 1; i >= 0; i-- {
		if name[i] == '.' {
			name = name[i+1:]
			break
		}
	}
	return r.Name == over.ID || r.Name == name
}

// rowsOf collects the sets of rows that an expression runs over.
func (w *builder) rowsOf(dst []*check.Rows, e syntax.Expr) []*check.Rows {
	switch e := e.(type) {
	case *syntax.Paren:
		return w.rowsOf(dst, e.X)
	case *syntax.Unary:
		return w.rowsOf(dst, e.X)
	case *syntax.Binary:
		return w.rowsOf(w.rowsOf(dst, e.X), e.Y)
	case *syntax.Compare:
		for _, x := range e.Operands {
			dst = w.rowsOf(dst, x)
		}
	case *syntax.AtMark:
		return w.rowsOf(dst, e.Y)
	case *syntax.Name:
		if s := w.used(e); s != nil {
			for _, r := range s.Value.Type.Rows {
				dst = addRows(dst, r)
			}
		}
	case *syntax.Call:
		return w.rowsOfCall(dst, e)
	}
	return dst
}

func (w *builder) rowsOfCall(dst []*check.Rows, c *syntax.Call) []*check.Rows {
	if reduces(c) {
		a := c.Args[0]
		for _, r := range w.rowsOf(nil, a.Value) {
			if a.Over != nil && !w.named(r, a.Over) {
				dst = addRows(dst, r)
			}
		}
		return dst
	}
	for i, a := range c.Args {
		if c.Fun.ID == "interpolate" && i < 2 {
			continue
		}
		dst = w.rowsOf(dst, a.Value)
	}
	return dst
}

func addRows(dst []*check.Rows, r *check.Rows) []*check.Rows {
	for _, o := range dst {
		if o == r {
			return dst
		}
	}
	return append(dst, r)
}

// atMark sets the entry at a mark, or its value.
func (w *builder) atMark(e *syntax.AtMark) (Node, rank) {
	if w.values {
		if n := w.found(e); n != nil {
			return n, rankOfValue(n)
		}
	}
	return w.looked(e, w.part(e.Y, rankedMeasure, true))
}

// looked sets the entry of a column at a mark in words.
func (w *builder) looked(e *syntax.AtMark, mark Node) (Node, rank) {
	symbols := *w
	symbols.values = false
	x := symbols.part(e.X, rankedAtom, true)
	return Row{x, Blank, Text{Text: "at"}, Blank, mark}, rankedSum
}

// lookup is a whole side that only looks an entry up. Its value stands in the
// output, so the mark alone is put in; nil where that stood there already.
func (w *builder) lookup(e *syntax.AtMark) Node {
	mark := w.side(e.Y)
	if !w.changed {
		return nil
	}
	n, _ := w.looked(e, mark)
	return n
}

// found is the value of a name at a mark, nil where it is not at hand.
func (w *builder) found(e *syntax.AtMark) Node {
	n, ok := unbracketed(e.X).(*syntax.Name)
	if !ok {
		return nil
	}
	s := w.used(n)
	mark, known := w.text(e.Y)
	if s == nil || !known {
		return nil
	}
	for _, r := range s.Value.Type.Rows {
		i := slices.Index(r.Marks, mark)
		if i < 0 {
			continue
		}
		w.at = append(w.at, place{r, i})
		entry := w.entry(s.Value.Type)
		w.at = w.at[:len(w.at)-1]
		if entry >= 0 {
			w.changed = true
			return w.Value(s, entry)
		}
	}
	return nil
}

// text is the value of an expression that is a text.
func (w *builder) text(e syntax.Expr) (string, bool) {
	switch e := unbracketed(e).(type) {
	case *syntax.Text:
		return e.Value, true
	case *syntax.Name:
		s := w.used(e)
		if s == nil || s.Value.Type.Kind != check.Text {
			return "", false
		}
		if i := w.entry(s.Value.Type); i >= 0 && i < len(s.Value.Text) {
			return s.Value.Text[i], true
		}
	}
	return "", false
}

// firstOf sets a choice from stock as it was written.
func (w *builder) firstOf(e *syntax.FirstOf) Node {
	row := Row{Text{Text: "first of"}, Blank}
	for i, v := range e.Values {
		if i > 0 {
			row = append(row, Comma)
		}
		row = append(row, w.side(v))
	}
	return append(row, with, w.side(e.Cond))
}
