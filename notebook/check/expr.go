package check

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/slab"
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
	refused map[*syntax.UnitRef]bool // units of a `where` that were reported: a name may stand in many places
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
	// inText tells that a value in text is looked up, which may stand above its
	// definition.
	inText bool
}

var invalid = &Node{Detail: &noDetail}

// slabs are where the parts of a program come from.
type slabs struct {
	nodes    slab.Slab[Node]
	args     slab.Slab[*Node]
	details  slab.Slab[Detail]
	lowers   slab.Slab[lower]
	plans    slab.Slab[Plan]
	defs     slab.Slab[Def]
	uses     slab.Slab[*Def]
	checks   slab.Slab[CheckPlan]
	branches slab.Slab[Branch]
}

// chunk is how many values the checker takes room for at once.
const chunk = 64

// node keeps a node.
func (l *lower) node(n Node) *Node {
	out := l.e.c.slabs.nodes.One(chunk)
	*out = n
	if n.Detail == nil {
		out.Detail = &noDetail
	}
	return out
}

func (l *lower) detail(d Detail) *Detail {
	out := l.e.c.slabs.details.One(chunk)
	*out = d
	return out
}

// room is a list for n nodes.
func (l *lower) room(n int) []*Node { return l.e.c.slabs.args.Take(n, 2*chunk) }

func (l *lower) args(nodes ...*Node) []*Node {
	out := l.room(len(nodes))
	copy(out, nodes)
	return out
}

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
		return l.node(Node{Op: TextLit, Type: Type{Kind: Text}, Expr: x, Detail: l.detail(Detail{Str: x.Value})})
	case *syntax.Name:
		return l.name(x)
	case *syntax.Paren:
		n := l.node(*l.expr(x.X))
		n.bare, n.Memo = false, nil
		return n
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
	n := l.node(Node{Op: Const, Expr: x, plain: true, bare: true})
	n.Type.Kind = Number
	first := x.Pieces[0]
	if !l.literalUnits(x) {
		return invalid
	}
	if !first.HasUnit {
		n.Num = first.SI(x.Neg)
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
		n.Num = first.SI(x.Neg)
		return n
	}
	for _, p := range x.Pieces {
		if p.Unit.Dim() != u.Dim() {
			return l.fail(diag.DimensionMismatch, p.UnitAt, fmt.Sprintf("%s is %s, but %s before it is %s",
				p.Unit, p.Unit.Dim().Article(), u, u.Dim().Article()),
				"the parts of `12 ft 6 in` have one dimension; a product is written with `*`")
		}
		n.Num += p.SI(x.Neg)
	}
	return n
}

// literalUnits looks at names in a literal's units that are also values. It is
// false where one may be either, so that the literal has no dimension.
func (l *lower) literalUnits(x *syntax.Number) bool {
	sure := true
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
				sure = false
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
	return sure
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
	switch {
	case u.IsAngular():
		return Radians
	case u.CountsTurns():
		return Hertz
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
	n := l.node(Node{Op: Load, Type: d.Type, Expr: x, Def: d, exact: d.exact, plain: d.plain, zero: d.zero})
	if u, ok := l.where[x.ID]; ok {
		return l.plainNumber(n, u)
	}
	return n
}

// plainNumber is a name of a `where`: the plain number of a unit.
func (l *lower) plainNumber(n *Node, u *syntax.UnitRef) *Node {
	if n.Type.Dim != u.Dim || (n.Type.Kind == Point) != u.Point {
		if l.refused[u] {
			l.failed = true
			return invalid
		}
		if l.refused == nil {
			l.refused = map[*syntax.UnitRef]bool{}
		}
		l.refused[u] = true
		message := fmt.Sprintf("%s is taken in %s, but it is %s", n.Def.ID, l.unitWords(u), l.e.c.describe(n.Type))
		if difference := map[string]string{"degC": "K", "°C": "K", "degF": "degR", "°F": "degR"}[u.Text]; difference != "" && n.Type.Dim == u.Dim {
			return l.fail(diag.DimensionMismatch, u.At, message, fmt.Sprintf("a difference is taken in %s: `%s [%s]`", difference, n.Def.Symbol, difference))
		}
		return l.fail(diag.DimensionMismatch, u.At, message,
			"the unit behind a name in `where` must have the name's dimension")
	}
	if asked := freqOf(u.Unit); !l.askFreq(n.Expr, n, asked, fmt.Sprintf("%s is taken in %s", n.Def.ID, u.Text)).ok() {
		return invalid
	}
	t := n.Type
	t.Kind, t.Dim, t.Freq = Number, units.Dimension{}, NoFreq
	return l.node(Node{Op: ToUnit, Type: t, Expr: n.Expr, Args: l.args(n), Detail: l.detail(Detail{Unit: u.Unit})})
}

func (l *lower) logical(x *syntax.Binary) *Node {
	n := l.node(Node{Op: And, Expr: x, Type: Type{Kind: Condition}})
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
	told := len(l.e.c.prog.Diagnostics)
	n := l.node(Node{Op: Compare, Expr: x, Type: Type{Kind: Condition}, Args: l.operands(x), Detail: l.detail(Detail{Cmp: x.Ops})})
	if where := l.where; len(where) > 0 && n.Args != nil && !alike(n.Args) {
		// `if d <= 8 mm` above `where d [mm]` compares the value, not its number
		l.where = nil
		l.e.c.prog.Diagnostics = l.e.c.prog.Diagnostics[:told] // warnings, which come again
		if whole := l.operands(x); whole != nil {
			n.Args = whole
		}
		l.where = where
	}
	if n.Args == nil {
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

// operands lowers what is compared; nil where any of it fails.
func (l *lower) operands(x *syntax.Compare) []*Node {
	args, bad := l.room(len(x.Operands)), false
	for i, operand := range x.Operands {
		args[i] = l.operand(x, operand)
		bad = bad || !args[i].ok()
	}
	if bad {
		return nil
	}
	return args
}

// operand lowers one side; a bare word beside a text gets its quotes offered.
func (l *lower) operand(x *syntax.Compare, side syntax.Expr) *Node {
	name, ok := side.(*syntax.Name)
	if !ok || strings.Contains(name.ID, ".") || l.e.lookup(name.ID) != nil {
		return l.value(side)
	}
	if _, later := l.e.c.later[name.ID]; later {
		return l.value(side)
	}
	for _, other := range x.Operands {
		_, text := other.(*syntax.Text)
		if n, ok := other.(*syntax.Name); ok {
			d := l.e.lookup(n.ID)
			text = d != nil && d.Type.Kind == Text
		}
		if text {
			return l.fail(diag.UnknownName, name.At, fmt.Sprintf("%s is not defined; a text stands in quotes", name.Text), fmt.Sprintf("write `\"%s\"`", name.Text))
		}
	}
	return l.value(side)
}

// alike tells that each operand has the dimension of the one before it.
func alike(args []*Node) bool {
	for i := 1; i < len(args); i++ {
		a, b := args[i-1], args[i]
		if !a.zero && !b.zero && (a.Type.Dim != b.Type.Dim || a.Type.Kind != b.Type.Kind) {
			return false
		}
	}
	return true
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
	for _, o := range [2][2]*Node{{a, b}, {b, a}} {
		if o[0].bare && o[1].Op == Load && angular(o[1].Def.Unit) && o[1].Def.Unit.String() != "mrad" {
			l.report(diag.Warning, diag.BareAngle, o[0].Expr.Span(), fmt.Sprintf("`%s` is an angle in %s, and the bare number %s is read as radians", l.print(o[1].Expr), o[1].Def.Unit.String(), l.print(o[0].Expr)),
				fmt.Sprintf("write `%s deg` for degrees, `%s rad` to say radians", l.print(o[0].Expr), l.print(o[0].Expr)))
		}
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
