package eval

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/units"
)

// drawings computes the plots and gathers what figures draw.
func (m *machine) drawings(steps []*Step) {
	for i := range m.prog.In.Blocks {
		if p := m.prog.Plots[i]; p != nil && !p.Failed {
			m.out.Blocks[i].Plot = m.plot(p)
		}
		if p := m.prog.Figures[i]; p != nil && !p.Failed {
			m.out.Blocks[i].Figure = m.figure(p)
		}
	}
}

// plot computes the curves of a plot over its range.
func (m *machine) plot(p *check.PlotPlan) *Plot {
	out := &Plot{Title: p.Tree.Title, Checks: p.Tree.Checks}
	if out.Checks {
		return out
	}
	err := m.ready(p)
	var x []float64
	if err == nil {
		x, err = m.points(p)
	}
	if err == nil {
		err = m.curves(p, out, x)
	}
	var dep depends
	if err != nil && !errors.As(err, &dep) {
		d := diag.Diagnostic{ID: diag.OutOfRange, Source: m.top.src, Span: p.Tree.From.Span().To(p.Tree.To.Span()), Message: err.Error()}
		var e *fault
		if errors.As(err, &e) {
			d.ID, d.Hints, d.Message = e.id, e.hints, e.message
		}
		m.report(d)
	}
	if err != nil {
		return nil
	}
	return out
}

// ready tells whether all that is drawn was computed: what failed in its own
// line fails again over the range, and is not reported twice.
func (m *machine) ready(p *check.PlotPlan) error {
	for _, curves := range [][]check.PlotCurve{p.Curves, p.Limits} {
		for _, c := range curves {
			if m.stepFor(c.Def, m.top) == nil {
				return depends(c.Def.Line)
			}
		}
	}
	return nil
}

// points are the values of the swept name, from one end of the range to the
// other; they become the marks of its rows.
func (m *machine) points(p *check.PlotPlan) ([]float64, error) {
	lo, err := m.number(p.From, m.top, &check.Type{}, 0)
	if err != nil {
		return nil, err
	}
	hi, err := m.number(p.To, m.top, &check.Type{}, 0)
	if err != nil {
		return nil, err
	}
	s := m.stepFor(p.Swept, m.top)
	if s == nil {
		return nil, depends(p.Swept.Line)
	}
	show := func(x float64) string {
		return PlainText(Value{Type: check.Type{Kind: check.Number}, Num: []float64{x}}.Printed(0, s.Unit, m.figures()))
	}
	if hi <= lo || same(lo, hi) {
		return nil, &fault{id: diag.OutOfRange, message: fmt.Sprintf("the range of %s runs backwards or is empty: from %s to %s", s.Symbol, show(lo), show(hi)), hints: []string{"the smaller value stands first"}}
	}
	n := p.Rows.N() - 1
	x := make([]float64, n+1)
	for i := range x {
		x[i] = lo + (hi-lo)*float64(i)/float64(n)
		if i == n {
			x[i] = hi
		}
		p.Rows.Marks[i] = s.Symbol + " = " + show(x[i])
	}
	return x, nil
}

// sweep computes again what depends on the swept name, over the given points.
func (m *machine) sweep(p *check.PlotPlan, x []float64) (*frame, error) {
	s := m.stepFor(p.Swept, m.top)
	f := newFrame(p.Scope, m.top, m.top.src)
	f.vals[p.Point.Slot] = Value{Type: p.Point.Type, Num: x}
	f.steps[p.Point.Slot] = &Step{Kind: Constant, ID: s.ID, Symbol: s.Symbol, Value: f.vals[p.Point.Slot], Unit: s.Unit, Figures: m.figures()}
	for _, plan := range p.Plans {
		if plan.Func {
			continue
		}
		m.kept.forget()
		if err := m.compute(plan, f, m.newStep(plan, f)); err != nil {
			return nil, err
		}
	}
	return f, nil
}

// curves computes again what depends on the swept name and draws it. Where a
// value does not exist at one of the points, they are moved between each other
// once: a place where a curve goes through infinity lies on a point by chance only.
func (m *machine) curves(p *check.PlotPlan, out *Plot, x []float64) error {
	s := m.stepFor(p.Swept, m.top)
	f, err := m.sweep(p, x)
	var e *fault
	if errors.As(err, &e) && e.id == diag.NotANumber {
		moved := slices.Clone(x)
		for i := 1; i < len(x)-1; i++ {
			moved[i] += (x[i+1] - x[i]) / 3
		}
		if g, second := m.sweep(p, moved); second == nil {
			f, x, err = g, moved, nil
		}
	}
	if err != nil {
		return err
	}
	out.X = Axis{Symbol: s.Symbol, Unit: s.Unit}
	out.At = s.Unit.FromSI(s.Value.Num[0])
	out.Present = s.Printed(0)
	xs := inUnit(x, s.Unit)
	b := &breaks{m: m, p: p, x: x}
	for i, c := range p.Curves {
		own := m.stepFor(c.Def, m.top)
		if i == 0 {
			out.Y = Axis{Symbol: own.Symbol, Unit: own.Unit}
		}
		lines, err := m.curve(c, own, f, b, xs, out.Y.Unit)
		if err != nil {
			return err
		}
		out.Curves = append(out.Curves, lines...)
	}
	for _, c := range p.Limits {
		own := m.stepFor(c.Def, m.top)
		lines, err := m.curve(c, own, f, b, xs, out.Y.Unit)
		if err != nil {
			return err
		}
		out.Limits = append(out.Limits, lines...)
	}
	return nil
}

// mostCurves is how many rows of one value are drawn as a curve each; of more
// only the governing one is.
const mostCurves = 6

// curve draws one value over the range: a line for each of its rows. It is
// broken where it goes through infinity.
func (m *machine) curve(c check.PlotCurve, own *Step, f *frame, b *breaks, xs []float64, u units.Unit) ([]Curve, error) {
	v, _ := f.value(c.Swept)
	sweep := b.p.Rows
	t := own.Value.Type
	entries := []int{own.Entry}
	if n := t.Count(); n > 1 && n <= mostCurves {
		entries = entries[:0]
		for e := 0; e < n; e++ {
			entries = append(entries, e)
		}
	}
	var out []Curve
	for _, e := range entries {
		line := Curve{ID: own.ID, Symbol: own.Symbol, Mark: t.Mark(e), Of: t.Count(), X: xs, Y: make([]float64, len(xs)),
			At: u.FromSI(own.Value.Num[e]), Present: own.Value.Printed(e, u, own.Figures)}
		if own.Unit.Equal(u) {
			line.Present = own.Printed(e)
		}
		joint := check.Type{Rows: append(append([]*check.Rows{}, t.Rows...), sweep)}
		at := func(i int) int { return max(joint.Project(e*len(xs)+i, v.Type), 0) }
		own := make([]float64, len(xs)) // in SI
		for i := range xs {
			own[i] = v.Num[at(i)]
			line.Y[i] = u.FromSI(own[i])
			if !finite(line.Y[i]) {
				return nil, &fault{id: diag.OutOfRange, message: fmt.Sprintf("%s has no value at %s", line.Symbol, joint.Mark(e*len(xs)+i))}
			}
		}
		line.Breaks = b.of(own, c.Swept, at)
		out = append(out, line)
	}
	return out, nil
}

func inUnit(x []float64, u units.Unit) []float64 {
	out := make([]float64, len(x))
	for i := range x {
		out[i] = u.FromSI(x[i])
	}
	return out
}

// figure gathers the steps whose values a sketch draws.
func (m *machine) figure(p *check.FigurePlan) *Figure {
	out := &Figure{Kind: p.Kind.Name}
	for i, n := range p.Args {
		out.Names = append(out.Names, p.Kind.Params[i].Name)
		if n == nil {
			out.Args, out.Exprs = append(out.Args, nil), append(out.Exprs, nil)
			continue
		}
		out.Exprs = append(out.Exprs, n.Expr)
		if n.Op == check.Load {
			s := m.stepFor(n.Def, m.top)
			if s == nil {
				return nil
			}
			out.Args = append(out.Args, s)
			continue
		}
		v := m.columnValue(n, m.top)
		for e, x := range v.Num {
			if math.IsNaN(x) || math.IsInf(x, 0) {
				if _, err := m.number(n, m.top, &n.Type, e); err != nil {
					var dep depends
					if !errors.As(err, &dep) {
						m.reportFault(err, &check.Plan{Stmt: nil, Def: &check.Def{At: p.Tree.At}})
					}
				}
				return nil
			}
		}
		s := &Step{Kind: Constant, ID: p.Kind.Params[i].Name, Symbol: p.Kind.Params[i].Name, Value: v, Unit: m.nodeUnit(n, m.top), Figures: m.figures()}
		s.Entry = largest(v)
		out.Args = append(out.Args, s)
	}
	return out
}
