package eval

import (
	"fmt"
	"math"
	"strings"

	"github.com/Knetic/govaluate"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// One entry of an expression is computed by govaluate. What govaluate is trusted
// with is multiplication, signs and logic; division, powers, sums and
// comparisons are functions of ours, since an infinity in the middle of an
// expression (`1/(1/0)`) would otherwise vanish from its result unseen. Names,
// literals, reductions and calls are parameters, found by their number, so that
// expressions of one form (`P/(2*A)` and `V/(3*B)`) share one compilation: to
// tokens, every operation inside another in its own brackets.

// compiled is what the evaluators keep of a node.
type compiled struct {
	expr   *govaluate.EvaluableExpression
	leaves []*check.Node // the parameters, by number
	ops    []*check.Node // the operations of ours, by number
	column *columnProgram
}

func (m *machine) memo(n *check.Node) *compiled {
	if c, ok := n.Memo.(*compiled); ok {
		return c
	}
	c := m.slabs.compiled.One(chunk)
	n.Memo = c
	return c
}

// slots are the names of parameters: a parameter's name is its number.
const slotBase = 0x20000 // from here up a number is always one code point

var (
	tokOpen      = govaluate.ExpressionToken{Kind: govaluate.CLAUSE, Value: '('}
	tokClose     = govaluate.ExpressionToken{Kind: govaluate.CLAUSE_CLOSE, Value: ')'}
	tokSeparator = govaluate.ExpressionToken{Kind: govaluate.SEPARATOR, Value: ","}
	tokMul       = govaluate.ExpressionToken{Kind: govaluate.MODIFIER, Value: "*"}
	tokMinus     = govaluate.ExpressionToken{Kind: govaluate.PREFIX, Value: "-"}
	tokNot       = govaluate.ExpressionToken{Kind: govaluate.PREFIX, Value: "!"}
	tokAnd       = govaluate.ExpressionToken{Kind: govaluate.LOGICALOP, Value: "&&"}
	tokOr        = govaluate.ExpressionToken{Kind: govaluate.LOGICALOP, Value: "||"}
)

func (m *machine) compile(n *check.Node) (*compiled, error) {
	c := m.memo(n)
	if c.expr != nil {
		return c, nil
	}
	r := &m.reading
	r.form, r.leaves, r.ops = r.form[:0], r.leaves[:0], r.ops[:0]
	r.node(n)
	c.leaves, c.ops = m.keep(r.leaves), m.keep(r.ops)
	if expr, ok := m.forms[string(r.form)]; ok {
		c.expr = expr
		return c, nil
	}
	b := builder{tokens: make([]govaluate.ExpressionToken, 0, 24)}
	b.node(n)
	expr, err := govaluate.NewEvaluableExpressionFromTokens(b.tokens)
	if err != nil {
		return nil, err
	}
	expr.ChecksTypes = false // the checker has run
	m.forms[string(r.form)] = expr
	c.expr = expr
	return c, nil
}

func (m *machine) keep(nodes []*check.Node) []*check.Node {
	out := m.slabs.nodes.Take(len(nodes), 4*chunk)
	copy(out, nodes)
	return out
}

// reading takes an expression apart: its form, by which it may share a
// compilation, and what stands in the form's places.
type reading struct {
	form        []byte
	leaves, ops []*check.Node
}

func (r *reading) node(n *check.Node) {
	switch n.Op {
	case check.Sum, check.Div, check.Pow, check.Compare, check.Builtin, check.ToUnit, check.FromUnit:
		r.ops = append(r.ops, n)
	case check.Neg, check.Not, check.Mul, check.And, check.Or:
	default:
		r.form = append(r.form, 'x')
		r.leaves = append(r.leaves, n)
		return
	}
	r.form = append(r.form, '(', 'A'+byte(n.Op))
	for _, minus := range n.Minus {
		if minus {
			r.form = append(r.form, '-')
		} else {
			r.form = append(r.form, '+')
		}
	}
	for _, op := range n.Cmp {
		r.form = append(r.form, 'a'+byte(op))
	}
	r.form = append(r.form, n.Fn...)
	if n.Op == check.ToUnit || n.Op == check.FromUnit {
		r.form = append(append(append(r.form, '['), n.Unit.String()...), ']')
	}
	r.form = append(r.form, ' ')
	for _, a := range n.Args {
		r.node(a)
	}
	r.form = append(r.form, ')')
}

// builder writes an expression as govaluate's tokens; it numbers leaves and
// operations as a reading does.
type builder struct {
	tokens      []govaluate.ExpressionToken
	leaves, ops int
}

func (b *builder) put(t ...govaluate.ExpressionToken) { b.tokens = append(b.tokens, t...) }

// operand puts an operand of an infix or prefix operator: what is itself one
// stands in brackets of its own.
func (b *builder) operand(n *check.Node) {
	switch n.Op {
	case check.Neg, check.Not, check.Mul, check.And, check.Or:
		b.put(tokOpen)
		b.node(n)
		b.put(tokClose)
	default:
		b.node(n)
	}
}

func (b *builder) function(n *check.Node) {
	b.put(govaluate.ExpressionToken{Kind: govaluate.FUNCTION, Value: operation(n, failedOp(b.ops))}, tokOpen)
	b.ops++
	for i, a := range n.Args {
		if i > 0 {
			b.put(tokSeparator)
		}
		b.operand(a)
	}
	b.put(tokClose)
}

func (b *builder) node(n *check.Node) {
	switch n.Op {
	case check.Neg:
		b.put(tokMinus)
		b.operand(n.Args[0])
	case check.Not:
		b.put(tokNot)
		b.operand(n.Args[0])
	case check.Mul:
		b.infix(tokMul, n)
	case check.And:
		b.infix(tokAnd, n)
	case check.Or:
		b.infix(tokOr, n)
	case check.Sum, check.Div, check.Pow, check.Compare, check.Builtin, check.ToUnit, check.FromUnit:
		b.function(n)
	default:
		b.put(govaluate.ExpressionToken{Kind: govaluate.VARIABLE, Value: string(rune(slotBase + b.leaves))})
		b.leaves++
	}
}

func (b *builder) infix(op govaluate.ExpressionToken, n *check.Node) {
	b.operand(n.Args[0])
	b.put(op)
	b.operand(n.Args[1])
}

// failedOp is the error of an operation without a finite result, by its number.
type failedOp int

func (failedOp) Error() string { return "no finite result" }

// undefined is the error of an operation without a finite result.
type undefined struct{ node *check.Node }

func (e undefined) Error() string { return "no finite result" }

// operation is the function of a node's form: it refuses what is not finite.
func operation(n *check.Node, failed failedOp) govaluate.ExpressionFunction {
	numeric := func(f func(args []any) float64) govaluate.ExpressionFunction {
		return func(args ...any) (any, error) {
			for _, a := range args {
				if x, ok := a.(float64); ok && !finite(x) {
					return nil, failed
				}
			}
			r := f(args)
			if !finite(r) {
				return nil, failed
			}
			return r, nil
		}
	}
	num := func(a any) float64 { x, _ := a.(float64); return x }
	switch n.Op {
	case check.Sum:
		return numeric(func(args []any) float64 { return sum(n.Minus, args) })
	case check.Div:
		return numeric(func(args []any) float64 { return divide(num(args[0]), num(args[1])) })
	case check.Pow:
		return numeric(func(args []any) float64 { return power(num(args[0]), num(args[1])) })
	case check.ToUnit:
		return numeric(func(args []any) float64 { return n.Unit.FromSI(num(args[0])) })
	case check.FromUnit:
		return numeric(func(args []any) float64 { return n.Unit.ToSI(num(args[0])) })
	case check.Compare:
		return func(args ...any) (any, error) { return compareChain(n.Cmp, failed, args) }
	}
	return numeric(func(args []any) float64 {
		xs := make([]float64, len(args))
		for i, a := range args {
			xs[i] = num(a)
		}
		return apply(n.Fn, xs)
	})
}

func sum(minus []bool, args []any) float64 {
	total, largest := 0.0, 0.0
	for i, a := range args {
		x, _ := a.(float64)
		if minus[i] {
			x = -x
		}
		total += x
		largest = math.Max(largest, math.Abs(x))
	}
	return settle(total, largest)
}

func compareChain(ops []syntax.Op, failed failedOp, args []any) (any, error) {
	for i, op := range ops {
		switch a := args[i].(type) {
		case string:
			b, _ := args[i+1].(string)
			if !compareText(op, a, b) {
				return false, nil
			}
		case float64:
			b, _ := args[i+1].(float64)
			if !finite(a) || !finite(b) {
				return nil, failed
			}
			if !compare(op, a, b) {
				return false, nil
			}
		}
	}
	return true, nil
}

// params gives govaluate the parameters of one entry: target is the type
// whose entries are counted by entry.
type params struct {
	m      *machine
	c      *compiled
	f      *frame
	target *check.Type
	entry  int
}

// Get returns the parameter of a number.
func (p *params) Get(name string) (any, error) {
	for _, r := range name {
		return p.m.leaf(p.c.leaves[int(r)-slotBase], p.f, p.target, p.entry)
	}
	return nil, fmt.Errorf("no parameter")
}

// entry computes one entry of a node: a float64, a string or a bool.
func (m *machine) entry(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	switch n.Op { // the commonest need no expression
	case check.Const:
		return n.Num, nil
	case check.TextLit:
		return n.Str, nil
	case check.Load, check.Reduce, check.At, check.AtRow, check.Interp, check.CallFunc, check.CallHelp, check.CallGo:
		return m.leaf(n, f, target, entry)
	}
	c, err := m.compile(n)
	if err != nil {
		return nil, err
	}
	v, err := m.eval(params{m, c, f, target, entry})
	if err != nil {
		if op, ok := err.(failedOp); ok {
			err = undefined{c.ops[op]}
		}
		return nil, m.explain(err, f, target, entry)
	}
	if x, ok := v.(float64); ok && !finite(x) {
		return nil, m.explain(undefined{n}, f, target, entry)
	}
	return v, nil
}

// eval evaluates with parameters whose memory the next evaluation takes over.
// Evaluations nest, since a parameter may be a call.
func (m *machine) eval(with params) (any, error) {
	var p *params
	if last := len(m.params) - 1; last >= 0 {
		p, m.params = m.params[last], m.params[:last]
	} else {
		p = new(params)
	}
	*p = with
	v, err := p.c.expr.Eval(p)
	m.params = append(m.params, p)
	return v, err
}

func (m *machine) number(n *check.Node, f *frame, target *check.Type, entry int) (float64, error) {
	v, err := m.entry(n, f, target, entry)
	if err != nil {
		return nan, err
	}
	x, ok := v.(float64)
	if !ok {
		return nan, fmt.Errorf("no number")
	}
	return x, nil
}

func (m *machine) truth(n *check.Node, f *frame, target *check.Type, entry int) (bool, error) {
	v, err := m.entry(n, f, target, entry)
	if err != nil {
		return false, err
	}
	b, _ := v.(bool)
	return b, nil
}

// fault is why a statement could not be computed: a diagnostic that lacks its source.
type fault struct {
	id      string
	at      diag.Span
	message string
	hints   []string
	placed  bool // the message says at which entry it arose
}

func (e *fault) Error() string { return e.message }

// explain says of an operation without a finite result which it was, and shows
// the values that made it.
func (m *machine) explain(err error, f *frame, target *check.Type, entry int) error {
	u, ok := err.(undefined)
	if !ok {
		return err
	}
	n := u.node
	what := fmt.Sprintf("`%s` has no finite value", f.print(n.Expr))
	args := make([]float64, len(n.Args))
	for i, a := range n.Args {
		args[i], _ = m.number(a, f, target, entry)
	}
	switch {
	case n.Op == check.Div && args[1] == 0 && n.Args[1].Op == check.Const:
		what = "division by zero"
	case n.Op == check.Div && args[1] == 0:
		what = fmt.Sprintf("division by zero: `%s` is 0", f.print(n.Args[1].Expr))
	case n.Op == check.Pow && args[0] == 0 && args[1] < 0:
		what = fmt.Sprintf("division by zero: `%s` is 0 and its exponent is negative", f.print(n.Args[0].Expr))
	case n.Op == check.Pow && args[0] < 0:
		what = fmt.Sprintf("`%s` is negative, and has no power that is not whole", f.print(n.Args[0].Expr))
	case n.Op == check.Builtin && n.Fn == "sqrt" && args[0] < 0:
		what = fmt.Sprintf("the root of a negative value: `%s`", f.print(n.Args[0].Expr))
	case n.Op == check.Builtin && (n.Fn == "ln" || n.Fn == "log10") && args[0] <= 0:
		what = fmt.Sprintf("%s of a value that is not positive: `%s`", n.Fn, f.print(n.Args[0].Expr))
	case n.Op == check.Builtin && (n.Fn == "asin" || n.Fn == "acos"):
		what = fmt.Sprintf("%s of a value outside -1 to 1: `%s`", n.Fn, f.print(n.Args[0].Expr))
	case n.Op == check.Builtin && len(args) == 2 && args[1] <= 0 && (n.Fn == "ceil" || n.Fn == "floor" || n.Fn == "round"):
		what = fmt.Sprintf("the step of %s is not positive: `%s`", n.Fn, f.print(n.Args[1].Expr))
	}
	out := &fault{id: diag.NotANumber, at: n.Expr.Span(), message: what}
	if values := m.valuesIn(n, f, target, entry); values != "" {
		out.hints = append(out.hints, "with "+values)
	}
	return out
}

// valuesIn lists the values that an expression names, as printed, and with as
// many figures more as it takes to tell them from what they are compared with.
func (m *machine) valuesIn(n *check.Node, f *frame, target *check.Type, entry int) string {
	var parts []string
	seen := map[*check.Def]bool{}
	figures := m.tellingIn(n, f, target, entry)
	var walk func(*check.Node)
	walk = func(n *check.Node) {
		if n.Op == check.Load && !seen[n.Def] && !n.Def.IsConst {
			seen[n.Def] = true
			if s := m.stepFor(n.Def, f); s != nil {
				if at := target.Project(entry, s.Value.Type); at >= 0 && at < s.Value.Len() {
					text := s.Printed(at)
					if s.Literal == nil && s.Cells == nil && figures > s.Figures {
						text = s.Value.Printed(at, s.Unit, figures)
					}
					parts = append(parts, s.Symbol+" = "+PlainText(text))
				}
			}
		}
		for _, a := range n.Args {
			walk(a)
		}
	}
	walk(n)
	if len(parts) > 8 {
		parts = append(parts[:8], "…")
	}
	return strings.Join(parts, ", ")
}

// print is an expression's text in the file it stands in.
func (f *frame) print(x syntax.Expr) string {
	return syntax.Print(f.src, x)
}
