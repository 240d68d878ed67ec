package maths

import (
	"strings"

	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
)

// functions are the built-in functions that are set under another name than
// the one they are called by.
var functionNames = map[string]string{
	"asin": "arcsin", "acos": "arccos", "atan": "arctan", "sum": "Σ",
}

// angular are the functions that need no brackets round a single symbol.
func angular(name string) bool {
	switch name {
	case "sin", "cos", "tan", "sinh", "cosh", "tanh", "ln":
		return true
	}
	return false
}

// reduces tells whether a call makes one value of the rows of its argument.
func reduces(c *syntax.Call) bool {
	switch c.Fun.ID {
	case "sum", "mean", "count", "extreme":
		return true
	case "min", "max":
		return len(c.Args) == 1
	}
	return false
}

func (w *builder) call(c *syntax.Call) (Node, rank) {
	if run := w.run(c); run != nil {
		return w.helper(c, run)
	}
	if w.functions[c.Fun.ID] != nil {
		return w.own(c), rankedAtom
	}
	switch c.Fun.ID {
	case "sqrt", "cbrt", "abs", "hypot":
		if n := w.drawn(c); n != nil {
			return n, rankedAtom
		}
	case "interpolate":
		// The table stays as its columns, at whatever row it is looked up.
		args, columns := make([]Node, len(c.Args)), *w
		columns.values = false
		for i, a := range c.Args {
			if i < 2 {
				args[i] = columns.side(a.Value)
			} else {
				args[i] = w.side(a.Value)
			}
		}
		return Call(Word{Text: "interpolate"}, args...), rankedAtom
	case "log10":
		return Call(Script{Base: Word{Text: "log"}, Sub: Number{Value: "10"}}, w.args(c)...), rankedAtom
	}
	if reduces(c) {
		return w.reduction(c)
	}
	if angular(c.Fun.ID) && len(c.Args) == 1 {
		return w.applied(Word{Text: c.Fun.ID}, c)
	}
	return Call(word(c.Fun.ID), w.marked(c)...), rankedAtom
}

// word is a built-in function's name as it is set.
func word(id string) Word {
	if name, ok := functionNames[id]; ok {
		id = name
	}
	return Word{Text: id}
}

// args sets the arguments of a call, with their names where the author gave them.
func (w *builder) args(c *syntax.Call) []Node {
	args := make([]Node, len(c.Args))
	for i, a := range c.Args {
		args[i] = w.side(a.Value)
		if a.Name != nil {
			args[i] = Pair(w.Name(a.Name.Text), args[i])
		}
	}
	return args
}

// Pair sets a name and its value as one: a line does not break between them.
func Pair(name, value Node) Node { return Fence{Body: Row{name, Relation("="), value}} }

// applied sets sin θ, with brackets round all but a symbol or a value.
func (w *builder) applied(name Node, c *syntax.Call) (Node, rank) {
	arg := w.side(c.Args[0].Value)
	switch arg.(type) {
	case Symbol, Number:
		if n, ok := arg.(Number); ok && strings.ContainsAny(n.Value, "eE") {
			break // sin 1.5 × 10⁻⁴ would be taken for a product
		}
		if !signed(arg) {
			return Row{name, arg}, rankedPower
		}
	}
	return Call(name, arg), rankedAtom
}

// open tells whether a function stands before its argument without brackets.
func open(n Node) bool {
	row, ok := n.(Row)
	if !ok || len(row) != 2 {
		return false
	}
	_, fence := row[1].(Fence)
	_, name := row[0].(Word)
	if s, ok := row[0].(Script); ok {
		_, name = s.Base.(Word)
	}
	return name && !fence
}

// functionPower sets sin² θ; nil for other powers.
func (w *builder) functionPower(e *syntax.Binary) Node {
	c, ok := unbracketed(e.X).(*syntax.Call)
	exponent, whole := unbracketed(e.Y).(*syntax.Number)
	if !ok || !whole || !angular(c.Fun.ID) || len(c.Args) != 1 {
		return nil
	}
	sup, ok := w.literal(exponent).(Number)
	if !ok || len(sup.Unit) > 0 || !figuresOnly(sup.Value) {
		return nil
	}
	n, _ := w.applied(Script{Base: Word{Text: c.Fun.ID}, Sup: sup}, c)
	return n
}

func figuresOnly(value string) bool {
	for _, r := range value {
		if r < '0' || r > '9' {
			return false
		}
	}
	return value != ""
}

// drawn sets the functions that have signs of their own: roots, bars, and the
// root of a sum of squares.
func (w *builder) drawn(c *syntax.Call) Node {
	switch {
	case c.Fun.ID == "hypot" && len(c.Args) >= 2:
		var sum Row
		for i, a := range c.Args {
			if i > 0 {
				sum = append(sum, Plus)
			}
			sum = append(sum, Script{Base: w.base(a.Value), Sup: Number{Value: "2"}})
		}
		return Root{Body: sum}
	case len(c.Args) != 1:
		return nil
	case c.Fun.ID == "sqrt":
		return Root{Body: w.side(c.Args[0].Value)}
	case c.Fun.ID == "cbrt":
		return Root{Body: w.side(c.Args[0].Value), Index: Number{Value: "3"}}
	case c.Fun.ID == "abs":
		return Abs(w.side(c.Args[0].Value))
	}
	return nil
}

// run is the call of a helper as it was run for the entry that is written out,
// nil for other calls.
func (w *builder) run(c *syntax.Call) *eval.Call {
	if w.step == nil {
		return nil
	}
	var first *eval.Call
	for _, run := range w.step.Calls {
		if run.Expr != c {
			continue
		}
		if w.entry(check.Type{Rows: run.Rows}) == run.Entry {
			return run
		}
		if first == nil {
			first = run
		}
	}
	return first
}

// helper sets the call of a helper or of a function of the author's own: as
// written, or as the value it gave, which its own lines tell of.
func (w *builder) helper(c *syntax.Call, run *eval.Call) (Node, rank) {
	results := run.Results
	if run.Helper == nil {
		results = run.Steps
	}
	if w.values && len(results) == 1 {
		// A result has rows of its own where a column went in.
		if entry := w.entry(results[0].Value.Type); entry >= 0 && entry < results[0].Value.Len() {
			w.changed = true
			n := w.Value(results[0], entry)
			return n, rankOfValue(n)
		}
	}
	if run.Helper == nil {
		return w.own(c), rankedAtom
	}
	return Call(Word{Text: c.Fun.Text}, w.args(c)...), rankedAtom
}

// own sets the call of a function of the author's own.
func (w *builder) own(c *syntax.Call) Node {
	f := w.Name(c.Fun.Text)
	if s := w.functions[c.Fun.ID]; s != nil {
		f = w.linked(c.Fun.Text, s)
	}
	return Call(f, w.args(c)...)
}

// marked sets the arguments of a function; of min and max the argument that
// decides is marked, where the values of all are at hand.
func (w *builder) marked(c *syntax.Call) []Node {
	args := w.args(c)
	if !w.values || c.Fun.ID != "min" && c.Fun.ID != "max" {
		return args
	}
	best, at := 0.0, -1
	for i, a := range c.Args {
		v, ok := w.number(a.Value)
		if !ok {
			return args
		}
		if at < 0 || c.Fun.ID == "min" && v < best || c.Fun.ID == "max" && v > best {
			best, at = v, i
		}
	}
	args[at] = governing(args[at])
	return args
}

// number is the value of an argument that is a single name or a literal, a
// name of `where` in its unit.
func (w *builder) number(e syntax.Expr) (float64, bool) {
	var n *syntax.Name
	switch e := unbracketed(e).(type) {
	case *syntax.Number:
		sum := 0.0
		for _, p := range e.Pieces {
			sum += p.SI(e.Neg)
		}
		return sum, true
	case *syntax.Name:
		n = e
	default:
		return 0, false
	}
	s := w.used(n)
	if s == nil || s.Value.Type.Kind == check.Text {
		return 0, false
	}
	i := w.entry(s.Value.Type)
	if !exists(s.Value, i) {
		return 0, false
	}
	for _, item := range w.where {
		if item.Name.ID == n.ID && item.Unit != nil {
			return item.Unit.Unit.FromSI(s.Value.Num[i]), true
		}
	}
	return s.Value.Num[i], true
}

// governing marks a value, or all those of a term, as what decides.
func governing(n Node) Node {
	switch n := n.(type) {
	case Number:
		n.Governs = true
		return n
	case Script:
		n.Base = governing(n.Base)
		return n
	case Fence:
		n.Body = governing(n.Body)
		return n
	case Root:
		n.Body = governing(n.Body)
		return n
	case Fraction:
		return Fraction{governing(n.Num), governing(n.Den)}
	case Row:
		row := make(Row, len(n))
		for i, part := range n {
			row[i] = governing(part)
		}
		return row
	}
	return n
}
