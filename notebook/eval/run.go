package eval

import (
	"errors"
	"math"

	"github.com/Knetic/govaluate"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/units"
)

// Carry is a computed calc whose values another one carries under Key.
// Steps holds its values by ID, columns and helpers' results included.
type Carry struct {
	Key    string
	Origin Origin // without its step
	Steps  map[string]*Step
}

// Result is what was computed, block by block.
type Result struct {
	Blocks      []BlockResult // by index of the input's blocks
	Refs        []RefResult   // by index of the input's values in text
	Diagnostics []diag.Diagnostic
}

// BlockResult is one block's steps: the lines of a calc block, the columns of
// a schedule or of load cases.
type BlockResult struct {
	Steps  []*Step
	Rows   *check.Rows
	Plot   *Plot   // nil where there is none or it failed
	Figure *Figure // likewise
}

// RefResult is a value named in text; Step is nil where it failed.
type RefResult struct {
	Step *Step
	Unit units.Unit
}

// Run computes a checked program. carried holds the files behind the front
// matter's keys. What fails is reported and, with all that depends on it, left out.
func Run(p *check.Program, carried map[string]*Carry) *Result {
	m := &machine{prog: p, carried: carried, out: &Result{Blocks: make([]BlockResult, len(p.In.Blocks))},
		marks: map[*check.Rows]map[string]int{}, consts: map[*check.Def]*Step{}, warned: map[warning]bool{}, forms: map[string]*govaluate.EvaluableExpression{},
		kept: kept{columns: map[*check.Node]keptColumn{}, results: map[*check.Node]keptResults{}, runs: map[*check.Node]keptRun{}}}
	m.out.Diagnostics = append(m.out.Diagnostics, p.Diagnostics...)
	m.top = newFrame(p.Scope, nil, p.In.Source)
	m.load0()
	steps := m.statements()
	for i, plan := range p.Plans {
		if steps[i] != nil {
			b := &m.out.Blocks[plan.Block]
			b.Steps = append(b.Steps, steps[i])
			b.Steps[len(b.Steps)-1].Brief = p.In.Blocks[plan.Block].Brief
		}
	}
	for i := range m.out.Blocks {
		m.out.Blocks[i].Rows = p.BlockRows[i]
	}
	m.govern(steps)
	m.finish(steps)
	m.drawings(steps)
	m.refs()
	diag.Sort(m.out.Diagnostics)
	return m.out
}

// load0 enters carried values.
func (m *machine) load0() {
	for _, d := range m.prog.Loads {
		if d.Carry == nil || d.Type.Kind == check.Bundle {
			continue
		}
		file := m.carried[d.Carry.Key]
		if file == nil || file.Steps[d.Key] == nil {
			m.top.failed[d.Slot] = max(d.Line, 1)
			continue
		}
		from := file.Steps[d.Key]
		origin := file.Origin
		origin.Key, origin.Step = d.Carry.Key, from
		s := &Step{Kind: Constant, ID: d.ID, Symbol: d.Symbol, Value: from.Value, Figures: m.figures(), Origin: &origin, Note: from.Note, Entry: from.Entry, Picks: from.Picks}
		s.Unit = m.unitFor(d.Type)
		if from.Declared || from.Kind == Given || from.Kind == Carried {
			s.Unit, s.Literal, s.Negated, s.Cells = from.Unit, from.Literal, from.Negated, from.Cells
		}
		m.top.vals[d.Slot], m.top.steps[d.Slot] = from.Value, s
		if from.Picks != nil {
			if m.top.picks == nil {
				m.top.picks = map[int][]int{}
			}
			m.top.picks[d.Slot] = from.Picks
		}
	}
}

// statements computes the statements in order.
func (m *machine) statements() []*Step {
	steps := make([]*Step, len(m.prog.Plans))
	for i, p := range m.prog.Plans {
		step := m.newStep(p, m.top)
		if step == nil {
			m.markFailed(p, m.top, max(p.Because, 1))
			continue
		}
		steps[i] = step
		m.running = p
		m.kept.forget()
		if !rowed(p) {
			m.recording = &step.Calls
		}
		err := m.compute(p, m.top, step)
		m.recording = nil
		if err != nil {
			m.failStatement(p, step, err)
			continue
		}
		m.settleStep(p, m.top, step)
	}
	m.running = nil
	return steps
}

// rowed tells that a statement has more than one entry, so that its calls are
// recorded only for the one that governs.
func rowed(p *check.Plan) bool {
	switch {
	case p.Check != nil:
		return len(p.Check.Type.Rows) > 0
	case p.Helper != nil:
		return len(p.Helper.Loop) > 0
	}
	return len(p.Choice.Type.Rows) > 0
}

// failStatement marks a statement as not computed and reports why, unless
// what it depends on was reported already.
func (m *machine) failStatement(p *check.Plan, step *Step, err error) {
	step.Failed, step.Because = true, p.Line
	step.Calls, step.Results = nil, nil
	var dep depends
	if errors.As(err, &dep) {
		step.Because = int(dep)
	} else {
		m.reportFault(err, p)
	}
	m.markFailed(p, m.top, max(step.Because, 1))
	if p.Def != nil && p.Def.Type.Kind != check.Bundle && p.Def.Scope == m.top.scope {
		m.top.steps[p.Def.Slot] = nil
	}
}

func (m *machine) reportFault(err error, p *check.Plan) {
	d := diag.Diagnostic{ID: diag.NotANumber, Source: m.top.src, Message: err.Error()}
	if p.Stmt != nil {
		d.Span = p.Stmt.Span()
	} else if p.Def != nil {
		d.Span = p.Def.At
	}
	var e *fault
	if errors.As(err, &e) {
		d.ID, d.Hints = e.id, e.hints
		if e.at != (diag.Span{}) {
			d.Span = e.at
		}
	} else if u, ok := err.(undefined); ok {
		d.Message, d.Span = "this has no finite value", u.node.Expr.Span()
	}
	m.report(d)
}

// settleStep finds the entry of a value over rows that is the largest in
// magnitude, which is printed in full unless another governs a check.
func (m *machine) settleStep(p *check.Plan, f *frame, step *Step) {
	step.Entry = largest(step.Value)
	for _, r := range step.Results {
		r.Entry = largest(r.Value)
	}
	if step.Check != nil {
		step.Entry = step.Check.Governs
	}
	if p.Choice.FirstOf != nil && len(step.Value.Type.Rows) == 0 {
		m.trials(p, f, step)
	}
}

func (m *machine) trials(p *check.Plan, f *frame, step *Step) {
	outer := m.recording
	m.recording = nil
	t := step.Value.Type
	m.firstOf(p.Choice.FirstOf, f, &t, step.Entry, &step.Trials)
	m.recording = outer
}

func largest(v Value) int {
	best := 0
	for i, x := range v.Num {
		if a, b := math.Abs(x), math.Abs(v.Num[best]); a > b && !same(a, b) || math.IsNaN(b) {
			best = i
		}
	}
	return best
}

// finish records, for every statement over rows, what is printed of the entry
// that governs, and holds the two evaluators to each other.
func (m *machine) finish(steps []*Step) {
	for i, p := range m.prog.Plans {
		s := steps[i]
		if s == nil || s.Failed || !rowed(p) || p.Column != nil {
			continue
		}
		m.running = p
		m.kept.forget()
		m.recording = &s.Calls
		switch {
		case p.Check != nil:
			m.checkAlone(p, s)
		case p.Helper != nil:
			loop := check.Type{Rows: p.Helper.Loop}
			at := 0
			if len(s.Results) > 0 {
				at = max(s.Results[0].Value.Type.Project(s.Results[0].Entry, loop), 0)
			}
			s.Entry = at
			m.runHelper(p.Helper, m.top, at)
		case p.Choice.FirstOf != nil:
			m.trials(p, m.top, s)
		default:
			m.crossCheck(p, s)
		}
		m.recording = nil
	}
	m.running = nil
}

// checkAlone computes the entry of a check that governs by govaluate too: when it is
// needed, and where it is, whether it holds.
func (m *machine) checkAlone(p *check.Plan, s *Step) {
	c, r := p.Check, s.Check
	required, at := true, c.Cond
	var err error
	if c.If != nil {
		required, err = m.truth(c.If, m.top, &r.Type, s.Entry)
	}
	agrees := required == r.Required[s.Entry]
	if !agrees {
		at = c.If
	} else if err == nil && required {
		var holds bool
		holds, err = m.truth(c.Cond, m.top, &r.Type, s.Entry)
		agrees = holds == r.OK[s.Entry]
	}
	if err == nil && !agrees {
		m.failStatement(p, s, m.disagree(at.Expr.Span(), r.Type, s.Entry))
	}
}

// agree is the relative difference that the two evaluators may have.
const agree = 1e-12

// crossCheck computes the entries printed in full (governing, first, last) by govaluate too.
func (m *machine) crossCheck(p *check.Plan, s *Step) {
	t := s.Value.Type
	calls := m.recording
	for _, e := range []int{s.Entry, 0, s.Value.Len() - 1} {
		x, _, err := m.choice(p.Choice, m.top, &t, e)
		m.recording = nil
		if y, ok := x.(float64); ok && err == nil && math.Abs(y-s.Value.Num[e]) > agree*math.Max(math.Abs(y), math.Abs(s.Value.Num[e])) {
			m.failStatement(p, s, m.disagree(p.Choice.Branches[0].Value.Expr.Span(), t, e))
			break
		}
	}
	m.recording = calls
}

// refs resolves the values named in text.
func (m *machine) refs() {
	for _, r := range m.prog.Refs {
		out := RefResult{}
		if r.Def != nil {
			if s := m.stepFor(r.Def, m.top); s != nil && !s.Failed {
				out.Step, out.Unit = s, s.Unit
				if r.Unit != nil {
					out.Unit = *r.Unit
				}
			}
		}
		m.out.Refs = append(m.out.Refs, out)
	}
}
