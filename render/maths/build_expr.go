package maths

import (
	"slices"
	"strings"

	"gusset/notebook/syntax"
)

// rank is how tightly a part of a formula holds together, from the loosest:
// where one stands inside a tighter one it needs brackets.
type rank int

const (
	rankedOr rank = iota
	rankedAnd
	rankedNot
	rankedCompare
	rankedSum
	rankedNeg
	rankedSlash // a division with a slash
	rankedProduct
	rankedMeasure // figures with a unit or a power of ten
	rankedPower
	rankedAtom
)

// signed tells whether a part of a formula starts with a minus sign, which
// needs brackets wherever anything stands before it.
func signed(n Node) bool {
	switch n := n.(type) {
	case Number:
		return strings.HasPrefix(n.Value, "-")
	case Row:
		return len(n) > 0 && signed(n[0])
	case Script:
		return signed(n.Base)
	case Op:
		return n.Sign == Minus.Sign
	}
	return false
}

// side sets an expression that stands alone: a side of a relation, an
// argument, a numerator.
func (w *builder) side(e syntax.Expr) Node {
	n, _ := w.expr(e)
	return n
}

// part sets an expression inside a bigger one: in brackets where it holds
// together less tightly than least, or starts with a sign and is not first.
func (w *builder) part(e syntax.Expr, least rank, first bool) Node {
	n, r := w.expr(e)
	return bracketed(n, r, least, first)
}

func bracketed(n Node, r, least rank, first bool) Node {
	if r < least || !first && signed(n) {
		return Paren(n)
	}
	return n
}

// expr sets an expression and says how tightly it holds together.
func (w *builder) expr(e syntax.Expr) (Node, rank) {
	switch e := e.(type) {
	case *syntax.Paren:
		return w.expr(e.X)
	case *syntax.Name:
		n := w.name(e)
		return n, rankOfValue(n)
	case *syntax.Number:
		n := w.literal(e)
		return n, rankOfValue(n)
	case *syntax.Text:
		return Text{Text: e.Value}, rankedAtom
	case *syntax.Unary:
		return w.unary(e)
	case *syntax.Binary:
		return w.binary(e)
	case *syntax.Compare:
		return w.compare(e), rankedCompare
	case *syntax.Call:
		return w.call(e)
	case *syntax.AtMark:
		return w.atMark(e)
	case *syntax.FirstOf:
		return w.firstOf(e), rankedCompare
	}
	return nil, rankedAtom
}

// literal sets a number as its author wrote it.
func (w *builder) literal(n *syntax.Number) Node {
	if len(n.Pieces) == 1 && !n.Neg && strings.IndexByte(n.Pieces[0].Figures, '_') < 0 {
		return Number{Value: n.Pieces[0].Figures, Unit: w.Unit(n.Pieces[0].Unit)}
	}
	var row Row
	for i, p := range n.Pieces {
		figures := strings.ReplaceAll(p.Figures, "_", "")
		if i == 0 && n.Neg {
			figures = "-" + figures
		}
		if i > 0 {
			row = append(row, Blank)
		}
		row = append(row, Number{Value: figures, Unit: w.Unit(p.Unit)})
	}
	if len(row) == 1 {
		return row[0]
	}
	return row
}

// rankOfValue is how tightly a name or a value holds together: 12 ft 6 in and
// 1 1/4 in are sums, 25 mm and 6×10⁻⁴ are products.
func rankOfValue(n Node) rank {
	switch n := n.(type) {
	case Row:
		return rankedSum
	case Script:
		if _, ok := n.Base.(Number); ok {
			return rankOfValue(n.Base)
		}
	case Number:
		switch {
		case strings.ContainsAny(n.Value, " /"):
			return rankedSum
		case len(n.Unit) > 0 || strings.ContainsAny(n.Value, "eE"):
			return rankedMeasure
		}
	}
	return rankedAtom
}

func (w *builder) unary(e *syntax.Unary) (Node, rank) {
	if e.Op == syntax.Not {
		return w.row(not, w.part(e.X, rankedCompare, true)), rankedNot
	}
	x := w.part(e.X, rankedSlash, false)
	return w.row(minus, x), rankedNeg
}

func (w *builder) binary(e *syntax.Binary) (Node, rank) {
	switch e.Op {
	case syntax.Add:
		return w.row(w.part(e.X, rankedSum, true), plus, w.part(e.Y, rankedSum, false)), rankedSum
	case syntax.Sub:
		return w.row(w.part(e.X, rankedSum, true), minus, w.part(e.Y, rankedNeg, false)), rankedSum
	case syntax.Mul:
		return w.product(e)
	case syntax.Div:
		return w.quotient(e)
	case syntax.Pow:
		return w.power(e)
	case syntax.And:
		return w.row(w.part(e.X, rankedAnd, true), and, w.part(e.Y, rankedAnd, true)), rankedAnd
	case syntax.Or:
		return w.row(w.part(e.X, rankedOr, true), or, w.part(e.Y, rankedOr, true)), rankedOr
	}
	return nil, rankedAtom
}

func (w *builder) compare(e *syntax.Compare) Node {
	row := w.room(2 * len(e.Operands))
	for i, x := range e.Operands {
		if i > 0 {
			row = append(row, relation(e.Ops[i-1].String()))
		}
		row = append(row, w.part(x, rankedSum, true))
	}
	return row
}

// product sets a product of any number of factors. Brackets that the author
// put round a product within it are not needed.
func (w *builder) product(e *syntax.Binary) (Node, rank) {
	var room [8]syntax.Expr
	factors := w.factors(room[:0], e)
	if first, ok := unbracketed(factors[0]).(*syntax.Unary); ok && first.Op == syntax.Neg {
		factors[0] = first.X
		return w.row(minus, w.times(factors, false)), rankedNeg
	}
	return w.times(factors, true), rankedProduct
}

// times sets factors side by side; first tells that nothing stands before them.
func (w *builder) times(factors []syntax.Expr, first bool) Node {
	row := w.room(2 * len(factors))
	for i, f := range factors {
		last := i == len(factors)-1
		n, r := w.expr(f)
		if r == rankedPower && !last && open(n) {
			r = rankedSum // sin θ in front of another factor
		}
		n = bracketed(n, r, rankedProduct, first && i == 0)
		if i > 0 {
			row = append(row, between(row[len(row)-1], n))
		}
		row = append(row, n)
	}
	return row
}

// factors takes a product apart.
func (w *builder) factors(dst []syntax.Expr, e syntax.Expr) []syntax.Expr {
	if b, ok := unbracketed(e).(*syntax.Binary); ok && b.Op == syntax.Mul {
		return w.factors(w.factors(dst, b.X), b.Y)
	}
	return append(dst, e)
}

// unbracketed takes the author's brackets off.
func unbracketed(e syntax.Expr) syntax.Expr {
	for {
		p, ok := e.(*syntax.Paren)
		if !ok {
			return e
		}
		e = p.X
	}
}

// between is the sign between two factors: none where they are told apart
// without one, else a dot.
func between(left, right Node) Node {
	if !bare1(right) || !standsBefore(left, right) {
		return dot
	}
	return beside
}

// bare1 tells whether a factor can follow another without a sign: it does not
// start with a figure.
func bare1(n Node) bool {
	switch n := n.(type) {
	case Number, Text:
		return false
	case Row:
		return len(n) > 0 && bare1(n[0])
	case Script:
		return bare1(n.Base)
	case Fraction:
		return bare1(n.Num) && bare1(n.Den)
	case Symbol:
		return oneLetter(n)
	}
	return true
}

// standsBefore tells whether a factor can stand before another without a sign:
// not a value with a unit, and not a name before brackets, which would look
// like a function with its argument.
func standsBefore(left, right Node) bool {
	switch left := left.(type) {
	case Number:
		return len(left.Unit) == 0
	case Symbol:
		if !oneLetter(left) {
			return false
		}
		return left.Head == "π" || !fenced(right)
	case Script:
		if _, ok := left.Base.(Symbol); ok {
			return standsBefore(left.Base, right)
		}
		return left.Base != nil && standsBefore(left.Base, right)
	case Row:
		return len(left) > 0 && !fenced(right) && standsBefore(left[len(left)-1], right)
	case Text:
		return false
	}
	return true
}

// fenced tells whether a factor starts with a bracket.
func fenced(n Node) bool {
	switch n := n.(type) {
	case Fence:
		return n.Open != "|"
	case Script:
		return fenced(n.Base)
	case Row:
		return len(n) > 0 && fenced(n[0])
	}
	return false
}

// oneLetter tells whether a symbol is a letter and not a word: two words side
// by side would read as one.
func oneLetter(s Symbol) bool {
	letters, _ := split(s.Head)
	n := 0
	for range letters {
		n++
	}
	return n == 1
}

// quotient sets a division as a fraction; a slash is used in exponents and
// inside other fractions. Division from the left, a/b/c, is one fraction.
func (w *builder) quotient(e *syntax.Binary) (Node, rank) {
	var room [4]syntax.Expr
	num, dens := e.X, append(room[:0], e.Y)
	for b, ok := num.(*syntax.Binary); ok && b.Op == syntax.Div; b, ok = num.(*syntax.Binary) {
		num, dens = b.X, append(dens, b.Y)
	}
	slices.Reverse(dens)
	if w.inline > 0 || w.depth > 0 {
		n := w.part(num, rankedProduct, true)
		if endsPerUnit(n) {
			n = Paren(n)
		}
		d, r := w.denominator(dens)
		return w.row(n, slash, bracketed(d, r, rankedPower, false)), rankedSlash
	}
	w.depth++
	n := w.side(num)
	d, _ := w.denominator(dens)
	w.depth--
	return Fraction{n, d}, rankedProduct
}

// endsPerUnit tells whether a numerator ends in a value whose unit has a division.
func endsPerUnit(n Node) bool {
	switch n := n.(type) {
	case Number:
		return n.Unit.perUnit()
	case Row:
		return len(n) > 0 && endsPerUnit(n[len(n)-1])
	case Script:
		return n.Sub == nil && endsPerUnit(n.Base) // a carried value and its mark
	}
	return false
}

// denominator sets the product of what is divided by.
func (w *builder) denominator(dens []syntax.Expr) (Node, rank) {
	if len(dens) == 1 {
		return w.expr(dens[0])
	}
	product := dens[0]
	for _, d := range dens[1:] {
		product = &syntax.Binary{Op: syntax.Mul, X: product, Y: d}
	}
	return w.expr(product)
}

// power sets a power. Its base is bracketed unless it is a symbol, a plain
// number or already in brackets; its exponent stands small and needs none.
func (w *builder) power(e *syntax.Binary) (Node, rank) {
	if n := w.functionPower(e); n != nil {
		return n, rankedPower
	}
	base := w.base(e.X)
	w.inline++
	exponent := w.side(e.Y)
	w.inline--
	return Script{Base: base, Sup: exponent}, rankedPower
}

// base sets what is raised to a power.
func (w *builder) base(e syntax.Expr) Node {
	n, r := w.expr(e)
	if _, root := n.(Root); root || signed(n) {
		r = rankedSum
	}
	return bracketed(n, r, rankedAtom, true)
}
