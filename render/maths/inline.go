package maths

// Inline is a node as it is set in a line of small text: fractions, which
// would be too small to read there, are written with a slash.
func Inline(n Node) Node {
	switch n := n.(type) {
	case Row:
		list := atoms(nil, n)
		row := make(Row, 0, len(list))
		for i, a := range list {
			f, ok := a.(Fraction)
			if !ok {
				row = append(row, Inline(a))
				continue
			}
			if bound(list, i) {
				row = append(row, Paren(slashed(f)))
			} else {
				row = append(row, slashed(f)...)
			}
		}
		return row
	case Fraction:
		return slashed(n)
	case Fence:
		n.Body = Inline(n.Body)
		return n
	case Root:
		n.Body = Inline(n.Body)
		return n
	case Script:
		if f, ok := n.Base.(Fraction); ok {
			n.Base = Paren(slashed(f))
		} else {
			n.Base = Inline(n.Base)
		}
		return n
	}
	return n
}

// InlineChain is a chain as it is set in a line of small text.
func InlineChain(c Chain) Chain {
	out := Chain{Left: Inline(c.Left)}
	for _, s := range c.Steps {
		out.Steps = append(out.Steps, Step{Sign: s.Sign, Right: Inline(s.Right)})
	}
	return out
}

func slashed(f Fraction) Row {
	num := Inline(f.Num)
	if loosest(atoms(nil, num)) < rankProduct || endsPerUnit(num) {
		num = Paren(num)
	}
	return Row{num, Slash, grouped(Inline(f.Den))}
}

// bound reports whether a fraction among atoms, written with a slash, would be
// read together with a factor behind it or a slash before it.
func bound(list []Node, i int) bool {
	if i > 0 {
		if o, ok := list[i-1].(Op); ok && o.Sign == Slash.Sign {
			return true
		}
	}
	if i+1 == len(list) {
		return false
	}
	switch next := list[i+1].(type) {
	case Op:
		return next.Class == Open || next.Sign == Beside.Sign || rankOf(next) == rankProduct
	case Space:
		return false
	}
	return true
}

// Part is a piece of a formula in running text, and the space between it and
// the piece before it in ems. A line may break there.
type Part struct {
	Node Node
	Gap  float64
}

// Parts is a formula in pieces for running text: parted before "and" and "or",
// and where a piece does not fit a line also before relations, behind commas
// and inside of brackets.
func Parts(n Node, fits func(Node) bool) []Part {
	return parted(nil, atoms(nil, n), Open, fits)
}

func parted(dst []Part, list []Node, prev Class, fits func(Node) bool) []Part {
	rank := breakable(list)
	if rank > rankAnd && fits(Row(list)) || rank > rankRelation {
		if rank > rankRelation && !fits(Row(list)) {
			if open := opened(list); open != nil {
				return parted(dst, open, prev, fits)
			}
		}
		if len(list) == 0 {
			return dst
		}
		left, _ := classes(list[0], prev)
		return append(dst, Part{Row(list), float64(gap(prev, left, false)) / 18})
	}
	from := 0
	for i := 1; i <= len(list); i++ {
		if i < len(list) && rankBefore(list, i) != rank {
			continue
		}
		dst = parted(dst, list[from:i], prev, fits)
		_, prev = list[i-1].edges()
		from = i
	}
	return dst
}
