package maths

import "gusset/units"

// AppendPlain appends a node as one line of plain text: fractions as a/b with
// the brackets that then are needed, subscripts as the names are written.
func AppendPlain(dst []byte, n Node) []byte {
	w := line{dst}
	w.node(n)
	return w.b
}

// AppendPlainChain appends a chain as one line of plain text.
func AppendPlainChain(dst []byte, c Chain) []byte {
	w := line{dst}
	w.node(c.Left)
	for i, s := range c.Steps {
		if i > 0 || c.Left != nil {
			w.raw(" ")
		}
		w.raw(Relation(s.Sign).Sign)
		w.raw(" ")
		w.node(s.Right)
	}
	return w.b
}

// A line writes plain text.
type line struct{ b []byte }

func (w *line) raw(s string) { w.b = append(w.b, s...) }

// list writes atoms side by side.
func (w *line) list(list []Node) {
	prev := Open
	for i, n := range list {
		left, right := n.edges()
		if o, ok := n.(Op); ok {
			w.op(o, prev, i > 0 && measured(list[i-1]))
		} else {
			if prev == Func && i > 0 && left != Open && apart(list[i-1], n) {
				w.raw(" ")
			}
			w.node(n)
		}
		prev = right
	}
}

// spaced reports whether atoms are set apart by blanks, as 12 ft 6 in is.
func spaced(list []Node) bool {
	for _, n := range list {
		if s, ok := n.(Space); ok && s > Thin {
			return true
		}
	}
	return false
}

// measured reports whether an atom ends in a unit: a dot right behind it would
// read as part of that.
func measured(n Node) bool {
	switch n := n.(type) {
	case Number:
		return len(n.Unit) > 0
	case Fraction:
		d := atoms(nil, n.Den)
		return len(d) == 1 && simple(d[0]) && measured(d[0])
	case Unit:
		return true
	}
	return false
}

func (w *line) op(o Op, prev Class, measured bool) {
	if o.Sign == Beside.Sign {
		o = Dot
	}
	switch {
	case signs(o, prev):
		w.raw(o.Sign)
	case o.Class == Punct:
		w.raw(o.Sign)
		w.raw(" ")
	case o.Sign == "not":
		w.raw("not ")
	case o.Class == Rel, rankOf(o) != rankProduct && o.Class == Bin, o.Class == Bin && measured:
		w.raw(" ")
		w.raw(o.Sign)
		w.raw(" ")
	default:
		w.raw(o.Sign)
	}
}

func (w *line) node(n Node) {
	switch n := n.(type) {
	case nil:
	case Row:
		w.row(n)
	case Symbol:
		w.symbol(n)
	case Number:
		w.number(n)
	case Unit:
		w.unit(n)
	case Word:
		w.raw(n.Text)
	case Text:
		w.raw(n.Text)
	case Op:
		w.raw(n.Sign)
	case Space:
		if n > Thin {
			w.raw(" ")
		}
	case Fraction:
		var room [12]Node
		num := atoms(room[:0], n.Num)
		w.part(n.Num, loosest(num) < rankProduct || spaced(num) || endsPerUnit(n.Num))
		w.raw("/")
		d := atoms(room[:0], n.Den)
		w.part(n.Den, len(d) == 1 && !simple(d[0]) || len(d) > 1 && !called(d))
	case Script:
		w.script(n)
	case Root:
		w.root(n)
	case Fence:
		w.raw(n.Open)
		w.node(n.Body)
		w.raw(n.Close)
	case Choice:
		w.choice(n)
	}
}

func (w *line) row(row Row) {
	var room [12]Node
	list := room[:0]
	for _, n := range row {
		list = atoms(list, n)
	}
	w.list(list)
}

// part writes a node, in brackets where they are needed.
func (w *line) part(n Node, brackets bool) {
	if brackets {
		w.raw("(")
	}
	w.node(n)
	if brackets {
		w.raw(")")
	}
}

// simple reports whether an atom can stand below a line or under a power in a
// line of text without brackets.
func simple(n Node) bool {
	switch n := n.(type) {
	case Symbol, Word, Text, Fence, Root:
		return true
	case Script:
		return true
	case Number:
		return len(n.Unit) == 0 && bare(n.Value)
	case Row:
		list := atoms(nil, n)
		return len(list) == 1 && simple(list[0]) || called(list)
	}
	return false
}

// called reports whether atoms are a name with its arguments.
func called(list []Node) bool {
	if len(list) != 2 {
		return false
	}
	if _, ok := list[1].(Fence); !ok {
		return false
	}
	switch name := list[0].(type) {
	case Word, Symbol:
		return true
	case Script:
		_, ok := name.Base.(Word)
		return ok
	}
	return false
}

func (w *line) symbol(s Symbol) {
	w.raw(s.Head)
	for _, p := range s.Sub {
		w.raw("_")
		w.raw(p)
	}
	w.raw(primes(s.Primes))
}

func (w *line) number(n Number) {
	w.raw(units.Typeset(n.Value))
	if len(n.Unit) > 0 {
		if n.Gap() > 0 {
			w.raw(" ")
		}
		w.unit(n.Unit)
	}
}

// power writes a whole number as superscript characters.
func (w *line) power(figures string) {
	for i := range len(figures) {
		switch c := figures[i]; {
		case c == '-':
			w.raw("⁻")
		case c >= '0' && c <= '9':
			w.raw(superscript(c))
		}
	}
}

func (w *line) unit(u Unit) {
	for _, t := range u {
		w.b = appendTerm(w.b, t)
		switch {
		case t.Den > 1:
			w.raw("^(")
			w.raw(exponent(t))
			w.raw(")")
		case t.Num < 0:
			w.raw("⁻")
			w.power(digits(-t.Num))
		case t.Num != 1:
			w.power(digits(t.Num))
		}
		if t.Close {
			w.raw(")")
		}
	}
}

func (w *line) script(s Script) {
	if mark, ok := s.Sup.(Text); ok && s.Sub == nil { // of a note
		w.node(s.Base)
		w.raw(mark.Text)
		return
	}
	if s.Base != nil {
		_, again := s.Base.(Script)
		w.part(s.Base, !simple(s.Base) || again)
	}
	if s.Sub != nil {
		w.raw("_")
		w.part(s.Sub, !simple(s.Sub))
	}
	if s.Sup == nil {
		return
	}
	if n, ok := s.Sup.(Number); ok && len(n.Unit) == 0 && whole(n.Value) {
		w.power(n.Value)
		return
	}
	w.raw("^")
	_, again := s.Sup.(Script)
	w.part(s.Sup, !simple(s.Sup) || again)
}

// whole reports whether figures are a whole number, signed or not.
func whole(value string) bool {
	negative, mantissa, power := figures(value)
	if power != "" || mantissa == "" || negative && mantissa == "0" {
		return false
	}
	for i := range len(mantissa) {
		if mantissa[i] < '0' || mantissa[i] > '9' {
			return false
		}
	}
	return true
}

func (w *line) root(r Root) {
	if r.Index != nil {
		if n, ok := r.Index.(Number); ok && whole(n.Value) {
			w.power(n.Value)
		} else {
			w.part(r.Index, true)
		}
	}
	w.raw("√")
	list := atoms(nil, r.Body)
	_, fenced := any(r.Body).(Fence)
	w.part(r.Body, !fenced && !(len(list) == 1 && short(list[0])))
}

// short reports whether an atom can stand behind a root sign in a line of text
// without brackets.
func short(n Node) bool {
	switch n := n.(type) {
	case Symbol:
		return true
	case Number:
		return len(n.Unit) == 0 && bare(n.Value)
	case Fence:
		return n.Open != "" && n.Close != ""
	}
	return false
}

func (w *line) choice(c Choice) {
	w.raw("{")
	for i, b := range c.Branches {
		if i > 0 {
			w.raw("; ")
		}
		w.node(b.Value)
		if b.Cond != nil {
			w.raw(" if ")
			w.node(b.Cond)
		} else {
			w.raw(" otherwise")
		}
		if b.Taken {
			w.raw(" ←")
		}
	}
	w.raw("}")
}
