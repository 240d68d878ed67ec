package eval

import (
	"fmt"
	"strings"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// newStep is the step of a statement before anything is computed.
func (m *machine) newStep(p *check.Plan, f *frame) *Step {
	s := m.slabs.steps.One(chunk)
	s.Stmt, s.Line, s.Figures, s.Failed, s.Because = p.Stmt, p.Line, m.figures(), p.Failed, p.Because
	switch st := p.Stmt.(type) {
	case *syntax.Definition:
		s.Kind, s.Note, s.Source = Computed, st.Note.Text, st.Note.Source
		s.ID, s.Symbol, s.Declared = st.Name.ID, st.Name.Text, st.Unit != nil && st.Unit.Quantity == ""
		switch {
		case p.Func:
			s.Kind = Function
		case p.IsGiven:
			s.Kind = Given
		case p.Carried:
			s.Kind = Carried
		}
	case *syntax.Check:
		s.Kind, s.Note, s.Source = Check, st.Note.Text, st.Note.Source
	case *syntax.Needs:
		s.Kind, s.Note, s.Source = Limit, st.Note.Text, st.Note.Source
	case *syntax.NoteLine:
		s.Kind, s.Note, s.Source = NoteLine, st.Note.Text, st.Note.Source
	case *syntax.Gap:
		s.Kind = Gap
	case nil:
		s.Kind = Computed
		if p.IsGiven {
			s.Kind = Given
		}
		s.ID, s.Symbol, s.Declared = p.Def.ID, p.Def.Symbol, p.Def.Unit != nil
	default:
		return nil // a line that could not be read
	}
	if p.Def != nil && !p.Failed && p.Def.Type.Kind != check.Bundle {
		s.Unit = m.unitOf(p.Def)
		s.Value.Type = p.Def.Type
	}
	if len(p.Uses) > 0 {
		s.Uses = m.slabs.uses.Take(len(p.Uses), 4*chunk)
		for i, d := range p.Uses {
			s.Uses[i] = m.stepFor(d, f)
		}
	}
	if p.Column != nil {
		s.Uses = m.columnUses(p.Column, f)
	}
	return s
}

// columnUses are the values that a column's cells name, each once.
func (m *machine) columnUses(c *check.ColumnPlan, f *frame) []*Step {
	var out []*Step
	seen := map[*check.Def]bool{}
	for _, cell := range c.Uses {
		for _, d := range cell {
			if d != nil && !seen[d] {
				seen[d] = true
				out = append(out, m.stepFor(d, f))
			}
		}
	}
	return out
}

// compute computes one statement into its frame. The step, where there is
// one, is completed.
func (m *machine) compute(p *check.Plan, f *frame, step *Step) error {
	switch {
	case p.Failed:
		m.markFailed(p, f, p.Because)
		return depends(p.Because)
	case p.Func:
		return nil
	case p.Column != nil:
		return m.computeColumn(p, f, step)
	case p.Helper != nil:
		return m.computeBundle(p, f, step)
	case p.Check != nil:
		if _, limit := p.Stmt.(*syntax.Needs); limit {
			return m.limit(p, f, step)
		}
		return m.computeCheck(p, f, step)
	case p.Def != nil:
		return m.computeValue(p, f, step)
	}
	return nil
}

// markFailed marks what a statement defines as failed.
func (m *machine) markFailed(p *check.Plan, f *frame, line int) {
	if p.Def == nil {
		return
	}
	if p.Def.Scope == f.scope {
		if p.Def.Type.Kind != check.Bundle && p.Def.Slot < len(f.failed) {
			f.failed[p.Def.Slot] = line
		}
		for _, r := range p.Def.Results {
			f.failed[r.Slot] = line
		}
	}
}

func (m *machine) computeValue(p *check.Plan, f *frame, step *Step) error {
	d := p.Def
	v := Value{Type: p.Choice.Type}
	var taken, picks []int
	if len(v.Type.Rows) == 0 {
		x, k, err := m.choice(p.Choice, f, &v.Type, 0)
		if err != nil {
			return err
		}
		if y, ok := x.(float64); ok {
			v.Num = m.float(y)
		} else {
			v.set(x)
		}
		if len(p.Choice.Branches) != 1 || p.Choice.Branches[0].Cond != nil {
			taken, picks = []int{k}, []int{k}
		}
	} else {
		var err error
		if v, taken, err = m.choiceRows(p.Choice, f); err != nil {
			return err
		}
		picks = taken
	}
	f.vals[d.Slot] = v
	if p.Choice.FirstOf == nil || p.Choice.FirstOf.Rows == nil {
		picks = m.inheritedPicks(p, f)
	}
	if picks != nil {
		if f.picks == nil {
			f.picks = map[int][]int{}
		}
		f.picks[d.Slot] = picks
	}
	if step == nil {
		return nil
	}
	step.Value, step.Picks = v, picks
	if len(p.Choice.Branches) > 1 || len(p.Choice.Branches) == 1 && p.Choice.Branches[0].Cond != nil {
		step.Taken = taken
	}
	step.Literal = d.Literal
	if def, ok := p.Stmt.(*syntax.Definition); ok && d.Literal != nil {
		_, step.Negated = def.Branches[0].Value.(*syntax.Unary)
	}
	m.carriedLine(p, f, step)
	f.steps[d.Slot] = step
	return nil
}

// inheritedPicks are the rows of a value that is only another name for a picked one.
func (m *machine) inheritedPicks(p *check.Plan, f *frame) []int {
	if p.Def.Picked == nil || len(p.Choice.Branches) == 0 {
		return nil
	}
	n := p.Choice.Branches[0].Value
	if n.Op != check.Load {
		return nil
	}
	o := f.of(n.Def.Scope)
	return o.picks[n.Def.Slot]
}

// carriedLine completes a line that is only another file's value.
func (m *machine) carriedLine(p *check.Plan, f *frame, step *Step) {
	n := (*check.Node)(nil)
	if len(p.Choice.Branches) == 1 {
		n = p.Choice.Branches[0].Value
	}
	if !p.Carried || n == nil {
		return
	}
	from := m.stepFor(n.Def, f)
	step.Origin = from.Origin
	if p.Def.Unit == nil {
		step.Unit = from.Unit
	}
	if step.Unit.Equal(from.Unit) {
		step.Literal, step.Negated, step.Cells = from.Literal, from.Negated, from.Cells
	}
}

// choice computes one entry of a right side: the value and the branch taken,
// or for `first of` the candidate.
func (m *machine) choice(ch check.Choice, f *frame, t *check.Type, entry int) (any, int, error) {
	if ch.FirstOf != nil {
		return m.firstOf(ch.FirstOf, f, t, entry, nil)
	}
	for i, b := range ch.Branches {
		if b.Cond != nil {
			ok, err := m.truth(b.Cond, f, t, entry)
			if err != nil {
				return nil, 0, err
			}
			if !ok {
				continue
			}
		}
		x, err := m.entry(b.Value, f, t, entry)
		return x, i, err
	}
	return nil, 0, m.noBranch(ch, f, t, entry)
}

func (m *machine) noBranch(ch check.Choice, f *frame, t *check.Type, entry int) error {
	first, last := ch.Branches[0].Cond.Expr.Span(), ch.Branches[len(ch.Branches)-1].Cond.Expr.Span()
	out := &fault{id: diag.OutOfRange, at: first, message: "none of the conditions holds"}
	if first != last {
		out.message = fmt.Sprintf("none of the %d conditions holds", len(ch.Branches))
	}
	var parts []string
	seen := map[string]bool{}
	for _, b := range ch.Branches {
		for _, s := range strings.Split(m.valuesIn(b.Cond, f, t, entry), ", ") {
			if s != "" && !seen[s] {
				seen[s] = true
				parts = append(parts, s)
			}
		}
	}
	if len(parts) > 0 {
		out.hints = append(out.hints, "with "+strings.Join(parts, ", "))
	}
	out.hints = append(out.hints, "a last branch `otherwise` serves all that is left")
	return out
}

// choiceRows computes a right side over rows.
func (m *machine) choiceRows(ch check.Choice, f *frame) (Value, []int, error) {
	v := Value{Type: ch.Type}
	count := v.Type.Count()
	if ch.FirstOf != nil || v.Type.Kind == check.Text {
		taken := make([]int, count)
		for e := 0; e < count; e++ {
			x, k, err := m.choice(ch, f, &v.Type, e)
			if err != nil {
				return v, nil, atEntry(err, v.Type, e)
			}
			taken[e] = k
			switch x := x.(type) {
			case float64:
				v.Num = append(v.Num, x)
			case string:
				v.Text = append(v.Text, x)
			}
		}
		return v, taken, nil
	}
	col, taken := m.branches(ch, f, &v.Type)
	for e, x := range col {
		if finite(x) {
			continue
		}
		y, _, err := m.choice(ch, f, &v.Type, e)
		if err != nil {
			return v, nil, atEntry(err, v.Type, e)
		}
		if n, ok := y.(float64); ok && finite(n) {
			return v, nil, m.disagree(ch.Branches[0].Value.Expr.Span(), v.Type, e)
		}
	}
	v.Num = col
	return v, taken, nil
}

// disagree reports that the two evaluators differ, which is a fault of the program.
func (m *machine) disagree(at diag.Span, t check.Type, entry int) error {
	return atEntry(&fault{id: diag.Internal, at: at, message: "the two ways of computing this value disagree; this is a fault of the program, please report it"}, t, entry)
}

// computeColumn computes a schedule's column, cell by cell.
func (m *machine) computeColumn(p *check.Plan, f *frame, step *Step) error {
	d, c := p.Def, p.Column
	v := Value{Type: d.Type, Text: c.Texts}
	v.Num = make([]float64, len(c.Cells))
	plain := &check.Type{}
	for r, n := range c.Cells {
		x, err := n.Num, error(nil)
		if n.Op != check.Const { // a formula
			x, err = m.number(n, f, plain, 0)
		}
		if err != nil {
			return err
		}
		v.Num[r] = x
	}
	f.vals[d.Slot] = v
	if step == nil {
		return nil
	}
	step.Value = v
	f.steps[d.Slot] = step
	if v.Type.Kind != check.Text {
		step.Cells = make([]string, len(c.Trees))
		for r, cell := range c.Trees {
			step.Cells[r] = ownFigures(cell, step.Unit)
		}
	}
	return nil
}

// ownFigures are the author's figures of a literal cell in the column's unit.
func ownFigures(cell *syntax.Cell, u units.Unit) string {
	x, minus := cell.Expr, ""
	if neg, ok := x.(*syntax.Unary); ok && neg.Op == syntax.Neg {
		x, minus = neg.X, "-"
	}
	lit, ok := x.(*syntax.Number)
	if !ok || len(lit.Pieces) != 1 || lit.Pieces[0].HasUnit && !lit.Pieces[0].Unit.Equal(u) {
		return ""
	}
	if lit.Neg {
		minus = "-"
	}
	figures := strings.ReplaceAll(lit.Pieces[0].Figures, "_", "")
	if minus == "" {
		return figures
	}
	return minus + figures
}

// computeBundle runs a helper with several results, once for each entry of
// the rows it loops over.
func (m *machine) computeBundle(p *check.Plan, f *frame, step *Step) error {
	hc, d := p.Helper, p.Def
	vals := make([]Value, len(d.Results))
	for i, r := range d.Results {
		vals[i].Type = r.Type
		if r.Type.Kind == check.Text {
			vals[i].Text = make([]string, r.Type.Count())
		} else {
			vals[i].Num = make([]float64, r.Type.Count())
		}
	}
	loop := check.Type{Rows: hc.Loop}
	recording := m.recording
	if len(hc.Loop) > 0 {
		m.recording = nil // the entry that governs is recorded later
	}
	for e := 0; e < loop.Count(); e++ {
		g, err := m.runHelper(hc, f, e)
		if err != nil {
			m.recording = recording
			return atEntry(err, loop, e)
		}
		for i, r := range hc.Results {
			m.place(&vals[i], g.vals[r.Slot], &loop, e)
		}
	}
	m.recording = recording
	for i, r := range d.Results {
		f.vals[r.Slot] = vals[i]
		if step == nil {
			continue
		}
		s := &Step{Kind: Computed, Stmt: nil, Line: step.Line, ID: r.ID, Symbol: r.Symbol, Value: vals[i], Unit: m.unitOf(r), Figures: step.Figures,
			Note: resultNote(hc, i), Source: step.Source}
		f.steps[r.Slot] = s
		step.Results = append(step.Results, s)
	}
	return nil
}

func resultNote(hc *check.HelperCall, i int) string {
	r := hc.Results[i]
	if r.Plan != nil {
		if def, ok := r.Plan.Stmt.(*syntax.Definition); ok {
			return def.Note.Text
		}
	}
	return ""
}

// place puts one run's result among the entries of all runs.
func (m *machine) place(all *Value, one Value, loop *check.Type, entry int) {
	joint := check.Type{Rows: append(append([]*check.Rows{}, loop.Rows...), one.Type.Rows...)}
	n := one.Len()
	for k := 0; k < n; k++ {
		// Every entry of the result belongs to one entry of the joint rows.
		at := position(&joint, entry*n+k, all.Type)
		if one.Type.Kind == check.Text {
			all.Text[at] = one.Text[k]
		} else {
			all.Num[at] = one.Num[k]
		}
	}
}

func position(joint *check.Type, entry int, t check.Type) int {
	return max(joint.Project(entry, t), 0)
}
