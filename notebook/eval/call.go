package eval

import (
	"fmt"
	"slices"
	"strings"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// maxDepth bounds calls inside calls while they are computed.
const maxDepth = 200

// callFunc calls an author's function for one entry. Where the body only
// works entry by entry, its parameters take that entry's values alone.
func (m *machine) callFunc(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	inst := n.Func
	g, err := m.functionFrame(n, f)
	if err != nil {
		return nil, err
	}
	alone := entrywise(inst)
	for i, p := range inst.Params {
		arg := n.Args[i]
		v := Value{Type: p.Type}
		switch {
		case !alone && len(arg.Type.Rows) > 0:
			v = m.argumentColumn(arg, f)
		case !within(arg.Type.Rows, inst.Body.Type.Rows): // the body does not use it, so that its rows are not the call's
			if v, err = m.wholeColumn(arg, f); err != nil {
				return nil, err
			}
		default:
			v.Type.Rows = nil
			x, err := m.entry(arg, f, target, entry)
			if err != nil {
				return nil, err
			}
			v.set(x)
		}
		m.bindParam(g, p, v)
		if len(v.Type.Rows) == 0 {
			m.ownFiguresOf(g.steps[p.Slot], arg, f, target, entry)
		}
	}
	t := inst.Body.Type
	outer := m.recording
	var step *Step
	if outer != nil {
		step = m.functionStep(inst, g)
		m.recording = &step.Calls
	}
	v, taken, err := m.choice(inst.Body, g, &t, max(target.Project(entry, t), 0))
	m.recording = outer
	if err == nil && step != nil {
		step.Value.set(v)
		if len(inst.Body.Branches) > 1 {
			step.Taken = []int{taken}
		}
		call := &Call{Expr: n.Expr.(*syntax.Call), Steps: []*Step{step}, Rows: target.Rows, Entry: entry}
		for _, p := range inst.Params {
			call.Args = append(call.Args, g.steps[p.Slot])
		}
		*outer = append(*outer, call)
	}
	return v, m.inFunction(err, n, f)
}

// within tells that all of some rows are among others.
func within(rows, among []*check.Rows) bool {
	for _, r := range rows {
		if !slices.Contains(among, r) {
			return false
		}
	}
	return true
}

// wholeColumn computes all entries of a value over rows, each of which has to exist.
func (m *machine) wholeColumn(n *check.Node, f *frame) (Value, error) {
	v := m.argumentColumn(n, f)
	for e, x := range v.lost() {
		if finite(x) {
			continue
		}
		if _, err := m.entry(n, f, &n.Type, e); err != nil {
			return v, atEntry(err, n.Type, e)
		}
	}
	return v, nil
}

// functionStep is the line that prints a function's formula with the values
// that it was called with.
func (m *machine) functionStep(inst *check.Function, g *frame) *Step {
	def := inst.Def
	s := &Step{Kind: Computed, Stmt: def, Line: g.src.LineAt(def.At.Start), ID: def.Name.ID, Symbol: def.Name.Text, Note: def.Note.Text, Source: def.Note.Source,
		Figures: m.figures(), Declared: def.Unit != nil && def.Unit.Quantity == ""}
	s.Value.Type = check.Type{Kind: inst.Body.Type.Kind, Dim: inst.Body.Type.Dim}
	s.Unit = m.unitFor(s.Value.Type)
	if s.Declared {
		s.Unit = def.Unit.Unit
	}
	for _, d := range inst.Uses {
		s.Uses = append(s.Uses, m.stepFor(d, g))
	}
	return s
}

// float is a value of one entry.
func (m *machine) float(x float64) []float64 {
	out := m.slabs.floats.Take(1, 4*chunk)
	out[0] = x
	return out
}

func (v *Value) set(x any) {
	switch x := x.(type) {
	case float64:
		v.Num = []float64{x}
	case string:
		v.Text = []string{x}
	}
}

func (m *machine) functionFrame(n *check.Node, f *frame) (*frame, error) {
	if f.depth > maxDepth {
		return nil, &fault{id: diag.BoundExceeded, at: n.Expr.Span(), message: fmt.Sprintf("calls are nested over %d deep, the bound", maxDepth)}
	}
	g := newFrame(n.Func.Scope, f.of(n.Func.Scope.Parent), f.of(n.Func.Scope.Parent).src)
	g.depth, g.call, g.caller = f.depth+1, n, f
	return g, nil
}

// bindParam gives a parameter its value, and a step for whoever prints it.
func (m *machine) bindParam(g *frame, p *check.Def, v Value) {
	g.vals[p.Slot] = v
	g.steps[p.Slot] = &Step{Kind: Constant, ID: p.ID, Symbol: p.Symbol, Value: v, Unit: m.unitOf(p), Figures: m.figures()}
}

// inFunction says of a fault inside a function which call it arose in.
func (m *machine) inFunction(err error, n *check.Node, f *frame) error {
	e, ok := err.(*fault)
	if !ok {
		return err
	}
	x := n.Expr.(*syntax.Call)
	out := *e
	out.at, out.message = x.At, fmt.Sprintf("in `%s`: %s", x.Fun.Text, e.message)
	return &out
}

// entrywise tells that a function's body needs no more than one entry of its
// arguments at a time: it reduces no rows of theirs and looks nothing up in them.
func entrywise(inst *check.Function) bool {
	for _, b := range inst.Body.Branches {
		if !elementary(b.Value, inst.Scope) || b.Cond != nil && !elementary(b.Cond, inst.Scope) {
			return false
		}
	}
	return true
}

// elementary tells the same of an expression in the scope of the function's parameters.
func elementary(n *check.Node, params *check.Scope) bool {
	switch n.Op {
	case check.At: // of a column above the function
		col := n.Args[0]
		return col.Op == check.Load && col.Def.Scope != params && elementary(n.Args[1], params)
	case check.Reduce, check.AtRow, check.Interp, check.CallHelp, check.CallGo:
		return false
	case check.Load:
		// What has rows above the function is projected from the caller's rows.
		return len(n.Def.Type.Rows) == 0 || n.Def.Scope == params
	case check.CallFunc:
		if !entrywise(n.Func) {
			return false
		}
	}
	for _, a := range n.Args {
		if !elementary(a, params) {
			return false
		}
	}
	return true
}

// callHelp runs a helper for one entry and returns its one result.
func (m *machine) callHelp(n *check.Node, f *frame, target *check.Type, entry int) (any, error) {
	loop := check.Type{Rows: n.Help.Loop}
	g, err := m.run(n, f, max(target.Project(entry, loop), 0))
	if err != nil {
		return nil, err
	}
	r := n.Help.Results[n.Result]
	v := &g.vals[r.Slot]
	at := 0
	if len(v.Type.Rows) > 0 {
		at = target.Project(entry, v.Type)
	}
	if v.Type.Kind == check.Text {
		return v.Text[at], nil
	}
	if x := v.Num[at]; x == x {
		return x, nil
	}
	return nil, &fault{id: diag.OutOfRange, at: n.Expr.Span(), message: fmt.Sprintf("%s has no result for these values", n.Help.Helper.Name.Text)}
}

// runHelper runs a helper's lines for one entry of the rows it loops over. While
// the statement is recorded for print, the call is kept with its steps.
func (m *machine) runHelper(hc *check.HelperCall, f *frame, entry int) (*frame, error) {
	if f.depth > maxDepth {
		return nil, &fault{id: diag.BoundExceeded, at: hc.Expr.At, message: fmt.Sprintf("calls are nested over %d deep, the bound", maxDepth)}
	}
	g := newFrame(hc.Scope, nil, hc.Helper.Source)
	g.depth = f.depth + 1
	loop := check.Type{Rows: hc.Loop}
	g.mark = loop.Mark(entry)
	outer := m.recording
	var call *Call
	if outer != nil {
		call = &Call{Expr: hc.Expr, Helper: hc.Helper, Library: hc.Library, Mark: loop.Mark(entry), Rows: hc.Loop, Entry: entry}
	}
	for i, p := range hc.Params {
		if m.recording = outer; hc.Columns[i] {
			m.recording = nil // a call in a column would be kept for each entry
		}
		v, err := m.argument(hc, i, f, &loop, entry)
		if err != nil {
			m.recording = outer
			return nil, err
		}
		m.bindParam(g, p, v)
		g.steps[p.Slot].Note, g.steps[p.Slot].Source = hc.Helper.Params[i].Note.Text, hc.Helper.Params[i].Note.Source
		if hc.Given[i] || hc.Args[i].Op == check.Const {
			m.ownFiguresOf(g.steps[p.Slot], hc.Args[i], f, &loop, entry)
		}
		if call != nil {
			call.Args = append(call.Args, g.steps[p.Slot])
		}
	}
	err := m.helperBody(hc, g, call)
	m.recording = outer
	if err != nil {
		return nil, err
	}
	if call != nil {
		for _, r := range hc.Results {
			call.Results = append(call.Results, g.steps[r.Slot])
		}
		*outer = append(*outer, call)
	}
	return g, nil
}

// ownFiguresOf lets a parameter print as its argument does: with the author's
// figures of a literal, of a given, to which it links, or of a cell of a schedule.
func (m *machine) ownFiguresOf(param *Step, arg *check.Node, f *frame, loop *check.Type, entry int) {
	switch x := arg.Expr.(type) {
	case *syntax.Number:
		param.Literal = x
		return
	case *syntax.Unary:
		if lit, ok := x.X.(*syntax.Number); ok && x.Op == syntax.Neg {
			param.Literal, param.Negated = lit, true
			return
		}
	}
	if arg.Op != check.Load {
		return
	}
	s := m.stepFor(arg.Def, f)
	switch {
	case s == nil:
	case len(param.Value.Type.Rows) > 0:
		if len(loop.Rows) == 0 && len(s.Cells) == len(param.Value.Num) && s.Unit.Equal(param.Unit) {
			param.Cells = s.Cells
		}
	case len(s.Value.Type.Rows) == 0:
		param.Literal, param.Negated, param.Anchor = s.Literal, s.Negated, s.Anchor
	case m.recording != nil && s.Unit.Equal(param.Unit):
		if at := loop.Project(entry, s.Value.Type); at >= 0 && at < len(s.Cells) {
			param.Cells = s.Cells[at : at+1]
		}
	}
}

// argument is the value a parameter takes for one entry of the loop: a plain
// value, or a column.
func (m *machine) argument(hc *check.HelperCall, i int, f *frame, loop *check.Type, entry int) (Value, error) {
	n, p := hc.Args[i], hc.Params[i]
	v := Value{Type: p.Type}
	if !hc.Columns[i] {
		from := f
		if !hc.Given[i] {
			from = newFrame(&check.Scope{}, nil, hc.Helper.Source)
		}
		x, err := m.entry(n, from, loop, entry)
		if err != nil {
			return v, err
		}
		v.set(x)
		return v, nil
	}
	col := m.ownColumn(n, f)
	joint := check.Type{Rows: append(append([]*check.Rows{}, hc.Loop...), p.Type.Rows...)}
	count := p.Type.Count()
	v.Num = make([]float64, count)
	for k := range v.Num {
		at := joint.Project(entry*count+k, n.Type)
		v.Num[k] = col[at]
		if !finite(col[at]) {
			if _, err := m.number(n, f, &n.Type, at); err != nil {
				return v, atEntry(err, n.Type, at)
			}
		}
	}
	return v, nil
}

// helperBody runs a helper's lines in order.
func (m *machine) helperBody(hc *check.HelperCall, g *frame, call *Call) error {
	for _, p := range hc.Plans {
		var step *Step
		var err error
		if call != nil {
			step, err = m.recorded(p, g)
		} else {
			err = m.compute(p, g, nil)
		}
		if err != nil {
			return m.inHelper(err, hc)
		}
		if step == nil {
			continue
		}
		if text, ok := strings.CutPrefix(step.Note, "Caution: "); ok && step.Kind == NoteLine {
			call.Cautions = append(call.Cautions, text)
			continue
		}
		call.Steps = append(call.Steps, step)
	}
	return nil
}

// recorded computes a statement and keeps what it prints, calls inside it included.
func (m *machine) recorded(p *check.Plan, g *frame) (*Step, error) {
	step := m.newStep(p, g)
	if step == nil {
		return nil, nil
	}
	outer := m.recording
	m.recording = &step.Calls
	err := m.compute(p, g, step)
	m.recording = outer
	if err == nil {
		m.settleStep(p, g, step)
	}
	return step, err
}

// inHelper points a fault inside a helper's body to the call.
func (m *machine) inHelper(err error, hc *check.HelperCall) error {
	e, ok := err.(*fault)
	if !ok {
		return err
	}
	hints := e.hints
	if hc.Helper.Note.Source != "" && e.id == diag.OutOfRange {
		hints = append(append([]string{}, hints...), fmt.Sprintf("%s follows %s", hc.Helper.Name.Text, hc.Helper.Note.Source))
	}
	return &fault{id: e.id, at: hc.Expr.At, message: fmt.Sprintf("in `%s`: %s", hc.Helper.Name.Text, e.message), hints: hints}
}

// limit holds a helper to a limit of its validity.
func (m *machine) limit(p *check.Plan, g *frame, step *Step) error {
	s := p.Stmt.(*syntax.Needs)
	t := p.Check.Type
	outer := m.recording
	if len(t.Rows) > 0 {
		m.recording = nil // the entry that is nearest to the limit is recorded below
	}
	r, err := m.verdicts(p, g)
	m.recording = outer
	for e, ok := range r.OK {
		if ok {
			continue
		}
		err := m.outside(p, s, g, &t, e)
		if !s.Warn {
			return err
		}
		m.warn(s, err.(*fault), g)
	}
	if err != nil {
		return err
	}
	if step != nil {
		m.complete(r, p, g)
		step.Check = r
		if len(t.Rows) > 0 {
			_, err = m.truth(p.Check.Cond, g, &t, r.Governs)
		}
	}
	return err
}

// outside says which limit does not hold, with the value, the limit and the clause.
func (m *machine) outside(p *check.Plan, s *syntax.Needs, g *frame, t *check.Type, entry int) error {
	message := fmt.Sprintf("the limit `%s` does not hold", syntax.Print(g.src, s.Cond))
	if c := p.Check; c.Sides != nil {
		sign, figures := ": ", m.telling(c.Sides, g, t, entry)
		for _, side := range c.Sides {
			bare := side
			if bare.Op == check.Neg {
				bare = bare.Args[0]
			}
			if bare.Op == check.Const || bare.Op == check.TextLit {
				continue
			}
			message += fmt.Sprintf("%s%s is %s", sign, syntax.Print(g.src, side.Expr), m.shown(side, g, t, entry, figures))
			sign = ", "
		}
	} else if values := m.valuesIn(m.failing(p.Check.Cond, g, t, entry), g, t, entry); values != "" {
		message += ": " + values
	}
	out := &fault{id: diag.OutOfRange, at: s.At, message: message}
	if note := s.Note.Text; note != "" {
		out.hints = append(out.hints, note)
	}
	if s.Note.Source != "" {
		out.hints = append(out.hints, "see "+s.Note.Source)
	}
	return out
}

// failing is the first part of a limit of several, joined by `and`, that does not hold.
func (m *machine) failing(n *check.Node, g *frame, t *check.Type, entry int) *check.Node {
	if n.Op != check.And {
		return n
	}
	for _, part := range n.Args {
		if holds, err := m.truth(part, g, t, entry); err == nil && !holds {
			return m.failing(part, g, t, entry)
		}
	}
	return n
}

// telling is how many figures tell the sides of a limit apart: those of the page, and as many more as it takes where
// a value is outside by less. Sides that are equal need no more.
func (m *machine) telling(sides []*check.Node, g *frame, t *check.Type, entry int) int {
	const most = 12
	out := m.figures()
	for i := 1; i < len(sides); i++ {
		x, _ := m.entry(sides[i-1], g, t, entry)
		y, _ := m.entry(sides[i], g, t, entry)
		a, isNumber := x.(float64)
		b, areNumbers := y.(float64)
		if !isNumber || !areNumbers || compare(syntax.Eq, a, b) {
			continue
		}
		for _, n := range sides[i-1 : i+1] {
			u := m.nodeUnit(n, g)
			for out < most && units.Format(u.FromSI(a), out) == units.Format(u.FromSI(b), out) {
				out++
			}
		}
	}
	return out
}

// tellingIn is the same for all comparisons in an expression.
func (m *machine) tellingIn(n *check.Node, f *frame, t *check.Type, entry int) int {
	out := m.figures()
	if n.Op == check.Compare {
		return m.telling(n.Args, f, t, entry)
	}
	for _, a := range n.Args {
		out = max(out, m.tellingIn(a, f, t, entry))
	}
	return out
}

// shown is one entry of a node as text: the author's own figures of a literal or
// a given, else the value in its printed unit to so many figures.
func (m *machine) shown(n *check.Node, f *frame, target *check.Type, entry, figures int) string {
	if lit, ok := n.Expr.(*syntax.Number); ok && n.Op == check.Const && lit.Pieces[0].HasUnit {
		return PlainText(printLiteral(&Step{Literal: lit}))
	}
	if n.Op == check.Load {
		if s := m.stepFor(n.Def, f); s != nil && s.Literal != nil {
			return PlainText(s.Printed(0))
		}
	}
	x, err := m.entry(n, f, target, entry)
	if err != nil {
		return "not known"
	}
	v := Value{Type: check.Type{Kind: n.Type.Kind, Dim: n.Type.Dim}}
	v.set(x)
	return PlainText(v.Printed(0, m.nodeUnit(n, f), figures))
}

// warn gives a limit's warning once for each statement that calls the helper.
func (m *machine) warn(s *syntax.Needs, e *fault, g *frame) {
	key := warning{s, m.running}
	if m.running == nil || m.warned[key] {
		return
	}
	if m.muted {
		m.held = true
		return
	}
	m.warned[key] = true
	at := m.running.Stmt.Span()
	name, where := "", ""
	if g.mark != "" {
		where = ", at " + g.mark // the first entry of those that it happens for
	}
	switch st := m.running.Stmt.(type) {
	case *syntax.Definition:
		at = st.Branches[0].Value.Span()
		name = st.Name.Text + ": "
	case *syntax.Check:
		at = st.Cond.Span()
	}
	m.report(diag.Diagnostic{Severity: diag.Warning, ID: diag.OutOfRange, Source: m.top.src, Span: at,
		Message: name + e.message + where, Hints: e.hints})
}

// quietly computes what may be more than is needed, as columns do: entries whose
// check is not required, branches that are not taken. Where a limit would have
// warned, only what is needed is computed again, entry by entry, to warn of that.
func (m *machine) quietly(columns, needed func()) {
	muted, held := m.muted, m.held
	m.muted, m.held = true, false
	columns()
	again := m.held
	m.muted, m.held = muted, held || again
	if again && !muted {
		m.held = false
		m.kept.forget()
		needed()
	}
}

func (m *machine) report(d diag.Diagnostic) { m.out.Diagnostics = append(m.out.Diagnostics, d) }
