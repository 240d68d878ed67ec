package eval

import (
	"fmt"
	"math"
	"slices"

	"github.com/Knetic/govaluate"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/slab"
	"gusset/notebook/syntax"
	"gusset/units"
)

// frame holds the values of one scope while it is computed: of the calc, of a
// function's parameters, of a helper's body.
type frame struct {
	scope  *check.Scope
	parent *frame
	src    *diag.Source
	vals   []Value
	failed []int // line of the error, by slot; 0 where there is none
	steps  []*Step
	picks  map[int][]int // rows that `first of` picked, by slot
	depth  int
	mark   string      // inside a helper: the entry it is run for, "" for a plain call
	call   *check.Node // inside a function: its call, nil elsewhere
	caller *frame      // where that stands
}

func newFrame(s *check.Scope, parent *frame, src *diag.Source) *frame {
	return &frame{scope: s, parent: parent, src: src, vals: make([]Value, s.Size), failed: make([]int, s.Size), steps: make([]*Step, s.Size)}
}

// of finds the frame that holds a value.
func (f *frame) of(s *check.Scope) *frame {
	for f.scope != s {
		f = f.parent
	}
	return f
}

func (f *frame) value(d *check.Def) (*Value, error) {
	o := f.of(d.Scope)
	if line := o.failed[d.Slot]; line > 0 {
		return nil, depends(line)
	}
	return &o.vals[d.Slot], nil
}

// depends is the error of a statement that needs one that failed.
type depends int

func (d depends) Error() string { return fmt.Sprintf("not computed, see line %d", int(d)) }

// machine computes one program.
type machine struct {
	prog    *check.Program
	carried map[string]*Carry
	top     *frame
	out     *Result
	marks   map[*check.Rows]map[string]int
	consts  map[*check.Def]*Step
	forms   map[string]*govaluate.EvaluableExpression // compilations by the form of the expression
	reading reading                                   // room for the next one's
	params  []*params                                 // those that no evaluation has at present
	slabs   slabs
	// recording collects the helper calls of the statement being printed.
	recording   *[]*Call
	warned      map[warning]bool
	muted, held bool      // warnings are held back, and one was: see quietly
	table       []float64 // read by interpolate last, and whether it is steady
	tableSteady bool
	looks       diag.Looks  // at marks, for messages
	running     *check.Plan // the statement being computed, for messages from inside a helper
	kept        kept
}

// slabs are where steps and what the evaluator compiles come from.
type slabs struct {
	steps    slab.Slab[Step]
	uses     slab.Slab[*Step]
	compiled slab.Slab[compiled]
	nodes    slab.Slab[*check.Node]
	floats   slab.Slab[float64]
	bools    slab.Slab[bool]
	results  slab.Slab[CheckResult]
	sides    slab.Slab[Side]
}

// chunk is how many values the evaluator takes room for at once.
const chunk = 64

// warning is a limit that only warns, at the statement that called its helper.
type warning struct {
	needs *syntax.Needs
	plan  *check.Plan
}

// stepFor returns the step that stands for a value, with its printed unit.
func (m *machine) stepFor(d *check.Def, f *frame) *Step {
	if d == nil {
		return nil
	}
	if d.IsConst {
		s, ok := m.consts[d]
		if !ok {
			s = &Step{Kind: Constant, ID: d.ID, Symbol: d.Symbol, Unit: m.unitFor(d.Type), Figures: m.figures(),
				Value: Value{Type: d.Type, Num: []float64{d.Const}}}
			m.consts[d] = s
		}
		return s
	}
	return f.of(d.Scope).steps[d.Slot]
}

func (m *machine) figures() int {
	if n := m.prog.In.Printing.Figures; n > 0 {
		return n
	}
	return 4
}

func (m *machine) unitOf(d *check.Def) units.Unit {
	if d.Unit != nil {
		return *d.Unit
	}
	return m.unitFor(d.Type)
}

func (m *machine) unitFor(t check.Type) units.Unit {
	if t.Kind != check.Number && t.Kind != check.Point {
		return units.Unit{}
	}
	u := m.prog.In.Printing.UnitFor(t.Dim, t.Kind == check.Point)
	switch { // turns and radians per second have one dimension
	case t.Freq == check.Radians && !u.IsAngular():
		return radiansPerSecond
	case t.Freq == check.Hertz && u.IsAngular():
		return hertz
	}
	return u
}

var radiansPerSecond, hertz = units.MustParse("rad/s"), units.MustParse("Hz")

// leaf computes one entry of what govaluate takes as a parameter.
func (m *machine) leaf(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	switch n.Op {
	case check.Const:
		return n.Num, nil
	case check.TextLit:
		return n.Str, nil
	case check.Load:
		return m.load(n, f, target, entry)
	case check.Reduce:
		return m.once(n, f, target, entry, func() (any, error) { return m.reduced(n, f, target, entry) })
	case check.At, check.AtRow:
		return m.picked(n, f, target, entry)
	case check.Interp:
		return m.interpolated(n, f, target, entry)
	case check.CallFunc:
		return m.once(n, f, target, entry, func() (any, error) { return m.callFunc(n, f, target, entry) })
	case check.CallHelp:
		return m.callHelp(n, f, target, entry)
	case check.CallGo:
		return m.callGo(n, f, target, entry)
	}
	return m.entry(n, f, target, entry)
}

func (m *machine) load(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	if n.Def.IsConst {
		return n.Def.Const, nil
	}
	v, err := f.value(n.Def)
	if err != nil {
		return nil, err
	}
	at := 0
	if len(v.Type.Rows) > 0 {
		at = target.Project(entry, v.Type)
	}
	if v.Type.Kind == check.Text {
		if v.Text[at] == noText {
			return nil, m.lostArgument(n.Def, f, at)
		}
		return v.Text[at], nil
	}
	x := v.Num[at]
	if x != x {
		if err := m.lostArgument(n.Def, f, at); err != nil {
			return nil, err
		}
		return nil, &fault{id: diag.OutOfRange, at: n.Expr.Span(), message: fmt.Sprintf("%s does not exist here: its helper has no such result for these values", n.Def.Symbol)}
	}
	return x, nil
}

// lostArgument says why a function's parameter has no value at an entry: its
// argument has none. It is nil for all other values.
func (m *machine) lostArgument(d *check.Def, f *frame, entry int) error {
	g := f.of(d.Scope)
	if g.call == nil {
		return nil
	}
	i := slices.Index(g.call.Func.Params, d)
	if i < 0 {
		return nil
	}
	arg := g.call.Args[i]
	_, err := m.entry(arg, g.caller, &arg.Type, entry)
	return err
}

// reduced reduces, for one entry, the entries of the argument that belong to it.
func (m *machine) reduced(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	arg := n.Args[0]
	if n.Fn == "count" {
		c := 1
		for _, r := range n.Over {
			c *= r.N()
		}
		return float64(c), nil
	}
	col := m.ownColumn(arg, f)
	wrong := -1
	at := func(i int) float64 {
		if finite(col[i]) {
			return col[i]
		}
		if wrong < 0 {
			wrong = i
		}
		return nan
	}
	picks := entriesOf(&arg.Type, n.Over, target, entry)
	r := reduce(n.Fn, len(picks), func(i int) float64 { return at(picks[i]) })
	if finite(r) {
		return r, nil
	}
	if wrong >= 0 {
		if _, err := m.number(arg, f, &arg.Type, wrong); err != nil {
			return nil, atEntry(err, arg.Type, wrong)
		}
	}
	return nil, &fault{id: diag.NotANumber, at: n.Expr.Span(), message: fmt.Sprintf("`%s` has no finite value", f.print(n.Expr))}
}

// entriesOf lists the entries of a value that a reduction over some of its
// rows takes for one entry of the target.
func entriesOf(t *check.Type, over []*check.Rows, target *check.Type, entry int) []int {
	base := map[*check.Rows]int{}
	for i := len(target.Rows) - 1; i >= 0; i-- {
		n := target.Rows[i].N()
		base[target.Rows[i]] = entry % n
		entry /= n
	}
	picks := []int{0}
	for _, r := range t.Rows {
		n := r.N()
		reducedRow := false
		for _, o := range over {
			reducedRow = reducedRow || o == r
		}
		next := make([]int, 0, len(picks))
		for _, p := range picks {
			if !reducedRow {
				next = append(next, p*n+base[r])
				continue
			}
			for k := 0; k < n; k++ {
				next = append(next, p*n+k)
			}
		}
		picks = next
	}
	return picks
}

// atEntry says at which entry a fault arose, where it does not say so already: the
// innermost knows best.
func atEntry(err error, t check.Type, entry int) error {
	e, ok := err.(*fault)
	if !ok || e.placed || len(t.Rows) == 0 {
		return err
	}
	out := *e
	out.message, out.placed = e.message+", at "+t.Mark(entry), true
	return &out
}

func (m *machine) rowOf(r *check.Rows, mark string) (int, bool) {
	index, ok := m.marks[r]
	if !ok {
		index = make(map[string]int, r.N())
		for i, k := range r.Marks {
			if _, twice := index[k]; !twice {
				index[k] = i
			}
		}
		m.marks[r] = index
	}
	i, ok := index[mark]
	return i, ok
}

// picked computes `column at mark`.
func (m *machine) picked(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	col, rows := n.Args[0], n.Over[0]
	row, err := m.row(n, f, target, entry)
	if err != nil {
		return nil, err
	}
	at := 0
	for _, r := range col.Type.Rows {
		i := row
		if r != rows {
			i = digit(target, entry, r)
		}
		at = at*r.N() + i
	}
	return m.entry(col, f, &col.Type, at)
}

func digit(t *check.Type, entry int, r *check.Rows) int {
	for i := len(t.Rows) - 1; i >= 0; i-- {
		n := t.Rows[i].N()
		if t.Rows[i] == r {
			return entry % n
		}
		entry /= n
	}
	return 0
}

// row finds the row that a mark, or an earlier pick, stands for.
func (m *machine) row(n *check.Node, f *frame, target *check.Type, entry int) (int, error) {
	rows := n.Over[0]
	if n.Op == check.AtRow {
		d := n.Args[1].Def
		v, err := f.value(d)
		if err != nil {
			return 0, err
		}
		return f.of(d.Scope).picks[d.Slot][max(target.Project(entry, v.Type), 0)], nil
	}
	v, err := m.entry(n.Args[1], f, target, entry)
	if err != nil {
		return 0, err
	}
	mark, _ := v.(string)
	row, ok := m.rowOf(rows, mark)
	if ok {
		return row, nil
	}
	message, hint := rows.NoRow(mark, m.looks.May(rows.N()))
	at := n.Expr.Span()
	if x, ok := n.Expr.(*syntax.AtMark); ok {
		at = x.Y.Span()
	}
	return 0, &fault{id: diag.UnknownMark, at: at, message: message, hints: []string{hint}}
}

func (m *machine) interpolated(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	x, err := m.number(n.Args[2], f, target, entry)
	if err != nil {
		return nil, err
	}
	xs, ys := m.ownColumn(n.Args[0], f), m.ownColumn(n.Args[1], f)
	if m.steady(xs) {
		if y := interpolate(xs, ys, x); finite(y) {
			return y, nil
		}
	}
	return nil, m.beyond(n, f, xs, x)
}

// steady remembers the column it was asked of last: most are read at many entries.
func (m *machine) steady(xs []float64) bool {
	if len(xs) == 0 || len(m.table) != len(xs) || &m.table[0] != &xs[0] {
		m.table, m.tableSteady = xs, steady(xs)
	}
	return m.tableSteady
}

// beyond says why a table gives no value.
func (m *machine) beyond(n *check.Node, f *frame, xs []float64, x float64) error {
	call := n.Expr.(*syntax.Call)
	u := m.nodeUnit(n.Args[0], f)
	show := func(x float64) string {
		return PlainText(Value{Type: check.Type{Kind: n.Args[0].Type.Kind}, Num: []float64{x}}.Printed(0, u, m.figures()))
	}
	low, high := math.Inf(1), math.Inf(-1)
	for _, v := range xs {
		low, high = math.Min(low, v), math.Max(high, v)
	}
	if finite(low) && finite(high) && (x < low || x > high) {
		return &fault{id: diag.OutOfRange, at: call.Args[2].Value.Span(), message: fmt.Sprintf("`%s` is %s, outside the table, which reaches from %s to %s",
			f.print(call.Args[2].Value), show(x), show(low), show(high)), hints: []string{"interpolate does not extrapolate; the table needs another row"}}
	}
	return &fault{id: diag.OutOfRange, at: call.Args[0].Value.Span(), message: fmt.Sprintf("`%s` neither rises nor falls steadily, so that a value between its rows is not defined", f.print(call.Args[0].Value))}
}

// nodeUnit is the unit in which a node's value is shown: its name's own, the
// literal's own, that of the first name of its dimension in it, else the preferred one.
func (m *machine) nodeUnit(n *check.Node, f *frame) units.Unit {
	if u, ok := m.namedUnit(n, n.Type, f); ok {
		return u
	}
	return m.unitFor(n.Type)
}

func (m *machine) namedUnit(n *check.Node, t check.Type, f *frame) (units.Unit, bool) {
	switch n.Op {
	case check.Load:
		if n.Type.Dim == t.Dim && n.Type.Kind == t.Kind {
			if s := m.stepFor(n.Def, f); s != nil {
				return s.Unit, true
			}
		}
		return units.Unit{}, false
	case check.Const:
		if lit, ok := n.Expr.(*syntax.Number); ok && n.Type.Dim == t.Dim && n.Type.Kind == t.Kind && lit.Pieces[0].HasUnit {
			return lit.Pieces[0].Unit, true
		}
		return units.Unit{}, false
	}
	for _, a := range n.Args {
		if u, ok := m.namedUnit(a, t, f); ok {
			return u, true
		}
	}
	return units.Unit{}, false
}

// callGo calls a function in Go for one entry.
func (m *machine) callGo(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	args := make([][]float64, len(n.Args))
	for i, a := range n.Args {
		if n.Native.Params[i].Column {
			args[i] = m.ownColumn(a, f)
			continue
		}
		x, err := m.number(a, f, target, entry)
		if err != nil {
			return nil, err
		}
		args[i] = []float64{x}
	}
	r, err := n.Native.F(args)
	if err != nil {
		return nil, &fault{id: diag.NoConvergence, at: n.Expr.Span(), message: err.Error()}
	}
	if math.IsInf(r, 0) {
		return nil, &fault{id: diag.NotANumber, at: n.Expr.Span(), message: fmt.Sprintf("`%s` has no finite value", f.print(n.Expr))}
	}
	return r, nil
}
