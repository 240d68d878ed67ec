package check

import (
	"fmt"
	"math/big"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// lower turns the expressions of one statement into checked nodes. It reports
// what it finds and goes on; what failed has an invalid type, which no later
// rule complains of again.
type lower struct {
	e       *env
	uses    []*Def // by slot; nil where nobody asks
	where   map[string]*syntax.UnitRef
	failed  bool
	because int
	// declared tells that the statement declares its unit, so that a unit
	// that is also a value's name draws no warning.
	declared bool
	// spaced are the units of literals that are also values in scope: a
	// mismatch in the statement offers the spelling with spaces.
	spaced []string
	// site is set inside the body of a function or helper: the call, where
	// messages point to, and the words that say which body they speak of.
	site   *diag.Span
	siteIn *env
	inside string
	cost   int // calls that the statement comes to
}

var invalid = &Node{}

// fail reports an error at a place of the statement.
func (l *lower) fail(id string, at diag.Span, message string, hints ...string) *Node {
	l.failed = true
	l.report(diag.Error, id, at, message, hints...)
	return invalid
}

func (l *lower) report(severity diag.Severity, id string, at diag.Span, message string, hints ...string) {
	src := l.e.src
	if l.site != nil {
		line := src.LineAt(at.Start)
		hints = append([]string{fmt.Sprintf("in `%s`, %s line %d", src.Slice(at), src.Name, line)}, hints...)
		message = "in " + l.inside + ": " + message
		src, at = l.siteIn.src, *l.site
	}
	l.e.c.report(diag.Diagnostic{Severity: severity, ID: id, Message: message, Hints: hints, Source: src, Span: at})
}

// depend notes that the statement needs a value that failed: nothing is said
// again, but nothing is computed either.
func (l *lower) depend(line int) *Node {
	if !l.failed {
		l.failed, l.because = true, line
	}
	return invalid
}

func (n *Node) ok() bool { return n.Type.Kind != Invalid }

func (l *lower) print(e syntax.Expr) string { return syntax.Print(l.e.src, e) }

// expr lowers one expression.
func (l *lower) expr(x syntax.Expr) *Node {
	switch x := x.(type) {
	case *syntax.Number:
		return l.number(x)
	case *syntax.Text:
		return &Node{Op: TextLit, Type: Type{Kind: Text}, Expr: x, Str: x.Value}
	case *syntax.Name:
		return l.name(x)
	case *syntax.Paren:
		n := *l.expr(x.X)
		n.bare = false
		n.Memo = nil
		return &n
	case *syntax.Unary:
		return l.unary(x)
	case *syntax.Binary:
		return l.binary(x)
	case *syntax.Compare:
		return l.compare(x)
	case *syntax.Call:
		return l.call(x)
	case *syntax.AtMark:
		return l.atMark(x)
	case *syntax.FirstOf:
		return l.fail(diag.Syntax, x.At, "`first of` stands only as the whole right side of a definition")
	}
	l.failed = true
	return invalid
}

// value lowers an expression that must be a value, not a condition and not a
// helper with several results.
func (l *lower) value(x syntax.Expr) *Node {
	n := l.expr(x)
	if n.Type.Kind == Condition {
		return l.fail(diag.Syntax, x.Span(), "a comparison is no value",
			"write it as `check "+l.print(x)+"`, or behind `if` as a condition")
	}
	return n
}

// number lowers a literal: exact to coherent SI, rounded once.
func (l *lower) number(x *syntax.Number) *Node {
	n := &Node{Op: Const, Expr: x, plain: true, bare: true}
	n.Type.Kind = Number
	first := x.Pieces[0]
	l.literalUnits(x)
	if !first.HasUnit {
		n.Num = pieceSI(first, x.Neg)
		n.zero = n.Num == 0
		return n
	}
	n.bare = false
	u := first.Unit
	n.Type.Dim = u.Dim()
	n.Type.Freq = freqOf(u)
	if len(x.Pieces) == 1 {
		if u.IsPoint() {
			n.Type.Kind = Point
		}
		n.Num = pieceSI(first, x.Neg)
		return n
	}
	for _, p := range x.Pieces {
		if p.Unit.Dim() != u.Dim() {
			return l.fail(diag.DimensionMismatch, p.UnitAt, fmt.Sprintf("%s is %s, but %s before it is %s",
				p.Unit, p.Unit.Dim().Article(), u, u.Dim().Article()),
				"the parts of `12 ft 6 in` have one dimension; a product is written with `*`")
		}
		n.Num += pieceSI(p, x.Neg)
	}
	return n
}

// literalUnits looks at names in a literal's units that are also values.
func (l *lower) literalUnits(x *syntax.Number) {
	for _, p := range x.Pieces {
		if !p.HasUnit {
			continue
		}
		spelled := l.e.src.Slice(p.At)
		var values []units.NameAt
		for i, at := range p.Unit.Names() {
			d := l.e.lookup(syntax.Canonical(at.Name))
			switch {
			case d == nil || d.IsConst:
			case i == 0 && p.Touch:
				l.fail(diag.AmbiguousUnit, p.At.To(p.UnitAt),
					fmt.Sprintf("`%s%s` may be %s times the value %s, or %s %s", spelled, at.Name, spelled, at.Name, spelled, at.Name),
					fmt.Sprintf("write `%s*%s` for the product, `%s %s` for the unit", spelled, at.Name, spelled, at.Name))
			case at.After == "/" || at.After == "*":
				values = append(values, at)
			}
		}
		if len(values) == 0 {
			continue
		}
		spaced := spacedUnit(spelled, p.Unit.String(), values)
		l.spaced = append(l.spaced, spaced)
		for _, at := range values {
			if l.declared {
				break
			}
			l.report(diag.Warning, diag.AmbiguousUnit, p.UnitAt,
				fmt.Sprintf("`%s` in `%s` is read as the unit, though %s is also a value (line %d)", at.Name, p.Unit, at.Name, l.e.lookup(syntax.Canonical(at.Name)).Line),
				fmt.Sprintf("write `%s` for the value, or declare the line's unit to keep the unit", spaced))
		}
	}
}

// spacedUnit spells `48 kN/L` as `48 kN / L`.
func spacedUnit(figures, unit string, values []units.NameAt) string {
	for i := len(values) - 1; i >= 0; i-- {
		at := values[i].Start
		if at > 0 && (unit[at-1] == '/' || unit[at-1] == '*') {
			unit = unit[:at-1] + " " + unit[at-1:at] + " " + unit[at:]
		}
	}
	return figures + " " + unit
}

func freqOf(u units.Unit) Freq {
	if u.Dim() != perTime {
		return NoFreq
	}
	if u.IsAngular() {
		return Radians
	}
	for _, at := range u.Names() {
		if n := at.Name; n == "rpm" || len(n) >= 2 && n[len(n)-2:] == "Hz" {
			return Hertz
		}
	}
	return NoFreq
}

func (l *lower) name(x *syntax.Name) *Node {
	d := l.resolve(x)
	if d == nil {
		return invalid
	}
	if d.Failed {
		return l.depend(d.Because)
	}
	if d.Type.Kind == Bundle {
		return l.fail(diag.DimensionMismatch, x.At, fmt.Sprintf("%s stands for a helper with %d results, and is no value itself", x.Text, len(d.Results)),
			"name one of them: "+list(resultNames(d)))
	}
	n := &Node{Op: Load, Type: d.Type, Expr: x, Def: d, exact: d.exact, plain: d.plain, zero: d.zero}
	if u, ok := l.where[x.ID]; ok {
		return l.plainNumber(n, u)
	}
	return n
}

// plainNumber is a name of a `where`: the plain number of a unit.
func (l *lower) plainNumber(n *Node, u *syntax.UnitRef) *Node {
	if n.Type.Dim != u.Dim || (n.Type.Kind == Point) != u.Point {
		return l.fail(diag.DimensionMismatch, u.At, fmt.Sprintf("%s is taken in %s, but it is %s", n.Def.ID, l.unitWords(u), l.e.c.describe(n.Type)),
			"the unit behind a name in `where` must have the name's dimension")
	}
	t := n.Type
	t.Kind, t.Dim, t.Freq = Number, units.Dimension{}, NoFreq
	return &Node{Op: ToUnit, Type: t, Expr: n.Expr, Args: []*Node{n}, Unit: u.Unit}
}

func (l *lower) unary(x *syntax.Unary) *Node {
	if x.Op == syntax.Not {
		n := l.expr(x.X)
		if !n.ok() {
			return n
		}
		if n.Type.Kind != Condition {
			return l.fail(diag.Syntax, x.X.Span(), "`not` needs a condition, but `"+l.print(x.X)+"` is "+l.e.c.describe(n.Type))
		}
		return &Node{Op: Not, Type: n.Type, Expr: x, Args: []*Node{n}}
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
	out := &Node{Op: Neg, Type: t, Expr: x, Args: []*Node{n}, plain: n.plain, zero: n.zero, bare: n.bare}
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
	r, err := x.Pieces[0].Rat()
	if err != nil {
		return nil
	}
	if x.Neg {
		r.Neg(r)
	}
	n.exact = r
	return r
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
	var chain []*syntax.Binary
	var first syntax.Expr = x
	for {
		b, ok := first.(*syntax.Binary)
		if !ok || b.Op != syntax.Mul && b.Op != syntax.Div {
			break
		}
		chain = append(chain, b)
		first = b.X
	}
	left := l.factor(first)
	for i := len(chain) - 1; i >= 0; i-- {
		b := chain[i]
		if l.tightUnit(b) {
			left = invalid
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
	n := &Node{Op: Mul, Expr: b, Args: []*Node{left, right}, plain: left.plain && right.plain}
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
	a, b := left.rat(), right.rat()
	if a == nil || b == nil || a.Num().BitLen()+a.Denom().BitLen() > 256 || b.Num().BitLen()+b.Denom().BitLen() > 256 {
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
	var chain []*syntax.Binary
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
	n := &Node{Op: Sum, Expr: x, Args: []*Node{total}, Minus: []bool{false}, Type: total.Type, plain: total.plain, exact: total.rat()}
	n.zero = total.zero
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
	if e := ratOf(b.Op, &Node{exact: n.exact, plain: n.plain, Op: Sum}, term); e != nil {
		n.exact = e
	} else {
		n.exact = nil
	}
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
	n := &Node{Op: Pow, Expr: x, Args: []*Node{base, exponent}, Type: Type{Kind: Number, Rows: rows}, plain: base.plain && exponent.plain}
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

func (l *lower) logical(x *syntax.Binary) *Node {
	n := &Node{Op: And, Expr: x, Type: Type{Kind: Condition}}
	if x.Op == syntax.Or {
		n.Op = Or
	}
	for _, side := range []syntax.Expr{x.X, x.Y} {
		s := l.expr(side)
		if !s.ok() {
			return invalid
		}
		if s.Type.Kind != Condition {
			return l.fail(diag.Syntax, side.Span(), fmt.Sprintf("`%s` joins conditions, but `%s` is %s", x.Op, l.print(side), l.e.c.describe(s.Type)),
				"a condition compares two values: `"+l.print(side)+" > 0`")
		}
		rows, err := l.e.c.union(n.Type.Rows, s.Type.Rows)
		if err != nil {
			return l.failRows(x.Span(), err)
		}
		n.Type.Rows = rows
		n.Args = append(n.Args, s)
	}
	return n
}

// compare lowers a chain of comparisons of values of one dimension.
func (l *lower) compare(x *syntax.Compare) *Node {
	n := &Node{Op: Compare, Expr: x, Type: Type{Kind: Condition}, Cmp: x.Ops}
	bad := false
	for _, operand := range x.Operands {
		o := l.value(operand)
		bad = bad || !o.ok()
		n.Args = append(n.Args, o)
	}
	if bad {
		return invalid
	}
	for i := range x.Ops {
		if !l.comparable(x, i, n.Args[i], n.Args[i+1]) {
			return invalid
		}
	}
	for _, o := range n.Args {
		rows, err := l.e.c.union(n.Type.Rows, o.Type.Rows)
		if err != nil {
			return l.failRows(x.Span(), err)
		}
		n.Type.Rows = rows
	}
	return n
}

func (l *lower) comparable(x *syntax.Compare, i int, a, b *Node) bool {
	at := x.Operands[i].Span().To(x.Operands[i+1].Span())
	words := func() string {
		return fmt.Sprintf("`%s` is %s, but `%s` is %s", l.print(x.Operands[i]), l.e.c.describe(a.Type), l.print(x.Operands[i+1]), l.e.c.describe(b.Type))
	}
	if (a.Type.Kind == Text) != (b.Type.Kind == Text) {
		l.fail(diag.DimensionMismatch, at, words(), "a text is compared with a text in quotes")
		return false
	}
	if a.Type.Kind == Text {
		if x.Ops[i] != syntax.Eq && x.Ops[i] != syntax.Ne {
			l.fail(diag.DimensionMismatch, x.OpsAt[i], fmt.Sprintf("texts have no order: `%s` compares numbers", x.Ops[i]), "texts are compared with == and !=")
			return false
		}
		return true
	}
	if a.zero || b.zero {
		if a.Type.Kind == Point || b.Type.Kind == Point {
			l.fail(diag.DimensionMismatch, at, "a temperature point is compared with a point, and 0 is a plain number", "write `0 degC` or `32 degF`")
			return false
		}
		return true
	}
	if a.Type.Dim != b.Type.Dim {
		l.mismatch(at, words(), a.Type, b.Type)
		return false
	}
	if (a.Type.Kind == Point) != (b.Type.Kind == Point) {
		l.fail(diag.DimensionMismatch, at, words(), "a temperature point is compared with a point (degC, degF), a difference with a difference (K, degR)")
		return false
	}
	if f, g := a.Type.Freq, b.Type.Freq; f != NoFreq && g != NoFreq && f != g {
		l.fail(diag.DimensionMismatch, at, fmt.Sprintf("`%s` is in %s, but `%s` in %s: they differ by the factor 2π", l.print(x.Operands[i]), f.words(), l.print(x.Operands[i+1]), g.words()),
			"omega = 2*pi*f turns rotations per second into radians per second")
		return false
	}
	return true
}

func (f Freq) words() string {
	if f == Radians {
		return "rad/s"
	}
	return "Hz or rpm"
}
