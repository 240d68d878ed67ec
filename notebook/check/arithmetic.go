package check

import (
	"fmt"
	"math/big"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

func (l *lower) unary(x *syntax.Unary) *Node {
	if x.Op == syntax.Not {
		n := l.expr(x.X)
		if !n.ok() {
			return n
		}
		if n.Type.Kind != Condition {
			return l.fail(diag.Syntax, x.X.Span(), "`not` needs a condition, but `"+l.print(x.X)+"` is "+l.e.c.describe(n.Type))
		}
		return l.node(Node{Op: Not, Type: n.Type, Expr: x, Args: l.args(n)})
	}
	n := l.value(x.X)
	if !n.ok() {
		return n
	}
	if n.Type.Kind == Point {
		return l.fail(diag.DimensionMismatch, x.At, "a temperature point has no negative",
			"a sign directly before a literal belongs to it: `-40 degC`; a difference is given in K or degR")
	}
	if n.Type.Kind != Number {
		return l.fail(diag.DimensionMismatch, x.At, "a minus sign needs a number, but `"+l.print(x.X)+"` is "+l.e.c.describe(n.Type))
	}
	t := n.Type
	t.Freq = n.Type.Freq // a sign is no arithmetic
	out := l.node(Node{Op: Neg, Type: t, Expr: x, Args: l.args(n), plain: n.plain, zero: n.zero, bare: n.bare})
	if r := n.rat(); r != nil {
		out.exact = new(big.Rat).Neg(r)
	}
	return out
}

// rat is the exact value of arithmetic on bare literals, nil for all else.
func (n *Node) rat() *big.Rat {
	if n.exact != nil || n.Op != Const || !n.Type.Dim.IsNumber() || !n.plain {
		return n.exact
	}
	x, ok := n.Expr.(*syntax.Number)
	if !ok || x.Pieces[0].HasUnit || len(x.Pieces) > 1 {
		return nil
	}
	r, ok := small(x.Pieces[0])
	if !ok {
		var err error
		if r, err = x.Pieces[0].Rat(); err != nil {
			return nil
		}
	}
	if x.Neg {
		r.Neg(r)
	}
	n.exact = r
	return r
}

// small is a number of few figures without a detour over their text.
func small(p syntax.Piece) (*big.Rat, bool) {
	mant, exp, ok := p.Decimal()
	if !ok || exp > 0 || exp < -15 {
		return nil, false
	}
	below := int64(1)
	for ; exp < 0; exp++ {
		below *= 10
	}
	return big.NewRat(mant, below), true
}

func (l *lower) binary(x *syntax.Binary) *Node {
	switch x.Op {
	case syntax.And, syntax.Or:
		return l.logical(x)
	case syntax.Add, syntax.Sub:
		return l.sum(x)
	case syntax.Pow:
		return l.power(x)
	}
	return l.product(x)
}

// product lowers a chain of `*` and `/` without recursing down its left side,
// which may be as long as a line.
func (l *lower) product(x *syntax.Binary) *Node {
	var short [8]*syntax.Binary
	chain := short[:0]
	var first syntax.Expr = x
	for {
		b, ok := first.(*syntax.Binary)
		if !ok || b.Op != syntax.Mul && b.Op != syntax.Div {
			break
		}
		chain = append(chain, b)
		first = b.X
	}
	left, i := invalid, len(chain)-1
	run := l.unitsAsFactors(chain)
	if i -= run; run == 0 {
		left = l.factor(first)
	} else if l.unitFactor(first) == "" {
		l.factor(first) // it may have mistakes of its own
	}
	for ; i >= 0; i-- {
		b := chain[i]
		if l.tightUnit(b) {
			left = invalid
			continue
		}
		if run := l.unitsAsFactors(chain[:i+1]); run > 0 {
			left, i = invalid, i-run+1
			continue
		}
		right := l.factor(b.Y)
		if !left.ok() || !right.ok() {
			left = invalid
			continue
		}
		left = l.multiply(b, left, right)
	}
	return left
}

// tightUnit reports `12e-6/K`: a bare number divided by what is no value, but a unit.
func (l *lower) tightUnit(b *syntax.Binary) bool {
	number, ok := b.X.(*syntax.Number)
	name, named := b.Y.(*syntax.Name)
	if !ok || !named || b.Op != syntax.Div || number.Pieces[0].HasUnit || l.e.lookup(name.ID) != nil || !units.IsUnitName(name.Text) {
		return false
	}
	figures := l.print(number)
	l.fail(diag.WrongUnitSpelling, b.Span(), fmt.Sprintf("`%s` stands here as a value, but no value of that name is defined; it is a unit", name.Text),
		fmt.Sprintf("write `%s 1/%s` for the unit, `%s / %s` for a value", figures, name.Text, figures, name.Text))
	return true
}

// longestUnit bounds in bytes how far units are read as one: no message helps with more.
const longestUnit = 60

// unitsAsFactors reports `5*kN/m`, a quantity that is written as a product of
// names which are no values, but units: it is one mistake. The chain's last
// operation is the first; how many of them the units take is returned, 0 where
// they are none.
func (l *lower) unitsAsFactors(chain []*syntax.Binary) int {
	first := chain[len(chain)-1]
	number, literal := first.X.(*syntax.Number)
	literal = literal && !number.Pieces[0].HasUnit
	unit, run := l.unitFactor(first.X), 0
	leads := unit != ""
	var last syntax.Expr
	for i := len(chain) - 1; i >= 0; i-- {
		text := l.unitFactor(chain[i].Y)
		if text == "" || len(unit) > longestUnit {
			break
		}
		if unit != "" {
			unit += chain[i].Op.String()
		}
		unit, last = unit+text, chain[i].Y
		run++
	}
	if run == 0 || !leads && (first.Op != syntax.Mul || run == 1 && !literal) {
		return 0
	}
	if u, err := units.Parse(unit); err != nil || u.StarAfterSlash() {
		return 0
	}
	at, meant := first.Y.Span().To(last.Span()), "1 "+unit
	switch {
	case leads:
		at = first.Span().To(last.Span())
	case literal:
		at, meant = first.Span().To(last.Span()), l.print(number)+" "+unit
	}
	l.fail(diag.MissingUnit, at, fmt.Sprintf("`%s` stands here as a value, but it is a unit", unit),
		fmt.Sprintf("a unit stands directly after a number: write `%s`", meant))
	return run
}

// unitFactor is the spelling of a factor that is no value but a unit, with its
// power; "" where it is something else.
func (l *lower) unitFactor(x syntax.Expr) string {
	power := ""
	if p, ok := x.(*syntax.Binary); ok && p.Op == syntax.Pow {
		y, sign := p.Y, "^"
		if u, ok := y.(*syntax.Unary); ok && u.Op == syntax.Neg {
			y, sign = u.X, "^-"
		}
		exponent, ok := y.(*syntax.Number)
		if !ok || exponent.Pieces[0].HasUnit {
			return ""
		}
		x, power = p.X, sign+exponent.Pieces[0].Figures
	}
	name, ok := x.(*syntax.Name)
	if !ok || !units.IsUnitName(name.Text) || l.e.lookup(name.ID) != nil || l.e.c.spaces[name.ID] != nil || l.e.c.lostCases > 0 {
		return ""
	}
	if _, later := l.e.c.later[name.ID]; later || l.e.function(name.ID) != nil || l.e.helper(name.ID) != nil {
		return ""
	}
	return name.Text + power
}

// factor lowers an operand of arithmetic, which must be a number.
func (l *lower) factor(x syntax.Expr) *Node {
	n := l.value(x)
	switch n.Type.Kind {
	case Point:
		return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("`%s` is a temperature point, which has no products", l.print(x)),
			"points may be subtracted, compared, and go through min, max, mean and interpolate; a difference is given in K or degR")
	case Text:
		return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("`%s` is a text, which has no arithmetic", l.print(x)),
			"texts are compared with == and !=, or pick a row with `at`")
	}
	return n
}

func (l *lower) multiply(b *syntax.Binary, left, right *Node) *Node {
	n := l.node(Node{Op: Mul, Expr: b, Args: l.args(left, right), plain: left.plain && right.plain})
	n.Type.Kind = Number
	var err error
	if b.Op == syntax.Mul {
		n.Type.Dim, err = left.Type.Dim.Mul(right.Type.Dim)
	} else {
		n.Op = Div
		n.Type.Dim, err = left.Type.Dim.Div(right.Type.Dim)
	}
	if err != nil {
		return l.fail(diag.BoundExceeded, b.OpAt, err.Error())
	}
	if n.Type.Rows, err = l.e.c.union(left.Type.Rows, right.Type.Rows); err != nil {
		return l.failRows(b.Span(), err)
	}
	n.exact = ratOf(b.Op, left, right)
	// A parameter that was given 0 stands for a zero of any dimension, and so
	// does what it is a factor of.
	n.zero = left.zero && left.Op != Const || b.Op == syntax.Mul && right.zero && right.Op != Const
	return n
}

// ratOf keeps the exact value of arithmetic on bare literals, which an
// exponent may need; sizes are bounded by giving up.
func ratOf(op syntax.Op, left, right *Node) *big.Rat {
	if !left.plain || !right.plain {
		return nil
	}
	a := left.rat()
	if a == nil {
		return nil
	}
	b := right.rat()
	if b == nil || a.Num().BitLen()+a.Denom().BitLen() > 256 || b.Num().BitLen()+b.Denom().BitLen() > 256 {
		return nil
	}
	switch op {
	case syntax.Add:
		return new(big.Rat).Add(a, b)
	case syntax.Sub:
		return new(big.Rat).Sub(a, b)
	case syntax.Mul:
		return new(big.Rat).Mul(a, b)
	case syntax.Div:
		if b.Sign() != 0 {
			return new(big.Rat).Quo(a, b)
		}
	}
	return nil
}

// sum lowers a chain of `+` and `-` to one node with all its terms, since the
// dust of rounding is measured against the largest of them.
func (l *lower) sum(x *syntax.Binary) *Node {
	var short [8]*syntax.Binary
	chain := short[:0]
	var first syntax.Expr = x
	for {
		b, ok := first.(*syntax.Binary)
		if !ok || b.Op != syntax.Add && b.Op != syntax.Sub {
			break
		}
		chain = append(chain, b)
		first = b.X
	}
	total := l.value(first)
	n := l.node(Node{Op: Sum, Expr: x, Args: l.room(len(chain) + 1)[:1], Type: total.Type, plain: total.plain, zero: total.zero, exact: total.rat()})
	n.Args[0] = total
	n.Detail = l.detail(Detail{Minus: make([]bool, 1, len(chain)+1)})
	bad := !total.ok()
	for i := len(chain) - 1; i >= 0; i-- {
		b := chain[i]
		term := l.value(b.Y)
		if bad || !term.ok() {
			bad = true
			continue
		}
		if !l.addTerm(n, b, term) {
			bad = true
		}
	}
	if bad {
		return invalid
	}
	n.Type.Freq = NoFreq
	return n
}

func (l *lower) addTerm(n *Node, b *syntax.Binary, term *Node) bool {
	for _, o := range []struct {
		n *Node
		x syntax.Expr
	}{{n, b.X}, {term, b.Y}} {
		if o.n.Type.Kind == Text {
			l.fail(diag.DimensionMismatch, o.x.Span(), fmt.Sprintf("`%s` is a text, which has no arithmetic", l.print(o.x)))
			return false
		}
	}
	if !n.zero && !term.zero && n.Type.Dim != term.Type.Dim {
		l.mismatch(b.Span(), sumWords(b.Op, l.e.c.describe(n.Type), l.print(b.X), l.e.c.describe(term.Type), l.print(b.Y)), n.Type, term.Type)
		return false
	}
	left, right := n.Type.Kind == Point, term.Type.Kind == Point
	switch {
	case left && right && b.Op == syntax.Add:
		l.fail(diag.DimensionMismatch, b.Span(), "two temperature points cannot be added",
			"one of them must be a difference, in K or degR")
		return false
	case left && right:
		n.Type.Kind = Number
	case right && b.Op == syntax.Sub:
		l.fail(diag.DimensionMismatch, b.Span(), "a temperature point cannot be taken from a difference")
		return false
	case right:
		n.Type.Kind = Point
	}
	rows, err := l.e.c.union(n.Type.Rows, term.Type.Rows)
	if err != nil {
		l.failRows(b.Span(), err)
		return false
	}
	if n.zero {
		n.Type.Dim = term.Type.Dim
	}
	n.exact = ratOf(b.Op, n, term)
	n.Type.Rows = rows
	n.zero = n.zero && term.zero
	n.plain = n.plain && term.plain
	n.Args = append(n.Args, term)
	n.Minus = append(n.Minus, b.Op == syntax.Sub)
	return true
}

func sumWords(op syntax.Op, a, left, b, right string) string {
	if op == syntax.Add {
		return fmt.Sprintf("%s and %s cannot be added: `%s` and `%s`", a, b, left, right)
	}
	return fmt.Sprintf("%s cannot be taken from %s: `%s` from `%s`", b, a, right, left)
}

// power lowers `x^y`: the exponent is a number, and where the base has a
// dimension a constant one, so that the result's dimension is known.
func (l *lower) power(x *syntax.Binary) *Node {
	base, exponent := l.factor(x.X), l.factor(x.Y)
	if !base.ok() || !exponent.ok() {
		return invalid
	}
	if !exponent.Type.Dim.IsNumber() {
		return l.fail(diag.DimensionMismatch, x.Y.Span(), fmt.Sprintf("an exponent is a plain number, but `%s` is %s", l.print(x.Y), l.e.c.describe(exponent.Type)))
	}
	rows, err := l.e.c.union(base.Type.Rows, exponent.Type.Rows)
	if err != nil {
		return l.failRows(x.Span(), err)
	}
	n := l.node(Node{Op: Pow, Expr: x, Args: l.args(base, exponent), Type: Type{Kind: Number, Rows: rows}, plain: base.plain && exponent.plain})
	r := exponent.rat()
	if base.Type.Dim.IsNumber() {
		n.exact = ratPower(base, r)
		return n
	}
	if r == nil {
		return l.fail(diag.DimensionMismatch, x.Y.Span(),
			fmt.Sprintf("the exponent of %s must be a constant, so that the result has a dimension, but `%s` is computed", l.e.c.describe(base.Type), l.print(x.Y)),
			"a constant is a literal, arithmetic of literals, or a name that stems from literals alone",
			"for a rule of a code with its own units write `where` with the unit of each name")
	}
	if !r.Num().IsInt64() || !r.Denom().IsInt64() {
		return l.fail(diag.BoundExceeded, x.Y.Span(), "the exponent's fraction is too large")
	}
	if n.Type.Dim, err = base.Type.Dim.Pow(r.Num().Int64(), r.Denom().Int64()); err != nil {
		return l.fail(diag.BoundExceeded, x.Y.Span(), err.Error())
	}
	return n
}

// ratPower is the exact small whole power of a bare literal.
func ratPower(base *Node, r *big.Rat) *big.Rat {
	b := base.rat()
	if b == nil || r == nil || !r.IsInt() || !r.Num().IsInt64() {
		return nil
	}
	k := r.Num().Int64()
	if k < -16 || k > 16 || b.Sign() == 0 && k < 0 || b.Num().BitLen()+b.Denom().BitLen() > 64 {
		return nil
	}
	out := big.NewRat(1, 1)
	for i := int64(0); i < max(k, -k); i++ {
		out.Mul(out, b)
	}
	if k < 0 {
		out.Inv(out)
	}
	return out
}
