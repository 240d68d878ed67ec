package eval

import (
	"math"

	"gusset/notebook/check"
	"gusset/notebook/syntax"
)

// computeCheck computes a check: its sides, the verdict and the utilisation of
// each entry, and which entry governs.
func (m *machine) computeCheck(p *check.Plan, f *frame, step *Step) error {
	r, err := m.verdicts(p, f)
	if err != nil || step == nil {
		return err
	}
	m.complete(r, p, f)
	step.Check, step.Entry = r, r.Governs
	return nil
}

// verdicts says of each entry of a check or a limit whether it is required, and whether it holds,
// up to the first that cannot be computed.
func (m *machine) verdicts(p *check.Plan, f *frame) (*CheckResult, error) {
	c := p.Check
	r := m.slabs.results.One(chunk)
	r.Ops, r.IfOps, r.Type, r.AllOK = c.Ops, c.IfOps, c.Type, true
	count := c.Type.Count()
	flags := m.slabs.bools.Take(2*count, 4*chunk)
	r.Required, r.OK = flags[:count:count], flags[count:]
	for i := range flags {
		flags[i] = true
	}
	var needed, holding []float64
	m.quietly(func() {
		needed, holding = m.verdictColumn(c.If, f, &c.Type), m.verdictColumn(c.Cond, f, &c.Type)
	}, func() { needed, holding = nil, nil })
	for e := range r.OK {
		required, holds := true, true
		var err error
		if c.If != nil {
			required, err = m.holdsAt(needed, c.If, f, &c.Type, e)
		}
		if err == nil && required {
			holds, err = m.holdsAt(holding, c.Cond, f, &c.Type, e)
		}
		if err != nil {
			return r, atEntry(err, c.Type, e)
		}
		r.Required[e], r.OK[e] = required, holds
		r.AllOK = r.AllOK && r.OK[e]
	}
	return r, nil
}

// verdictColumn computes a condition over rows for all entries at once; nil for
// one that has none, and where the calls in it are recorded one by one.
func (m *machine) verdictColumn(n *check.Node, f *frame, t *check.Type) []float64 {
	if n == nil || len(t.Rows) == 0 || m.recording != nil {
		return nil
	}
	return m.column(n, f, t)
}

// holdsAt is one entry of a condition; what the column cannot tell is computed
// once more, to say why.
func (m *machine) holdsAt(column []float64, n *check.Node, f *frame, t *check.Type, entry int) (bool, error) {
	if column != nil && finite(column[entry]) {
		return column[entry] == 1, nil
	}
	return m.truth(n, f, t, entry)
}

// complete adds the sides of a check whose verdicts are known, the utilisations and what governs.
func (m *machine) complete(r *CheckResult, p *check.Plan, f *frame) {
	c := p.Check
	outer := m.recording
	m.recording = nil // the calls in it are recorded
	m.quietly(func() { r.Sides, r.NeededIf = m.sides(c.Sides, f), m.sides(c.IfSides, f) }, func() {})
	m.recording = outer
	r.Ratio = m.slabs.floats.Take(len(r.OK), 4*chunk)
	for e := range r.Ratio {
		if r.Ratio[e] = nan; r.Required[e] {
			r.Ratio[e] = m.utilisation(r, e)
		}
	}
	r.Governs = r.worst()
	r.Equal = r.equalSides(r.Governs)
}

func (m *machine) sides(nodes []*check.Node, f *frame) []Side {
	if len(nodes) == 0 {
		return nil
	}
	out, shared := m.slabs.sides.Take(len(nodes), chunk), m.sidesUnit(nodes, f)
	for i, n := range nodes {
		out[i] = m.side(n, f, shared)
	}
	return out
}

// side computes an operand; it is shown in its own name's unit, else in the
// unit of the side it is compared with.
func (m *machine) side(n *check.Node, f *frame, shared *check.Node) Side {
	s := Side{Expr: n.Expr, Figures: m.figures(), Unit: m.nodeUnit(n, f)}
	if shared != nil && (!named(n) || m.bare(n, f)) && shared.Type.Dim == n.Type.Dim && shared.Type.Kind == n.Type.Kind {
		s.Unit = m.nodeUnit(shared, f)
	}
	s.Value = m.columnValue(n, f)
	return s
}

// sidesUnit is the side whose unit the others are shown in: the first that is
// only a name or a literal, else the first that holds one of its dimension.
func (m *machine) sidesUnit(sides []*check.Node, f *frame) *check.Node {
	for _, n := range sides {
		if _, own := m.namedUnit(n, n.Type, f); own && named(n) && !m.bare(n, f) {
			return n
		}
	}
	for _, n := range sides {
		if _, own := m.namedUnit(n, n.Type, f); own {
			return n
		}
	}
	return nil
}

// bare tells that a side is only a name that is printed without a unit, as a
// number or an angle: beside degrees or percent it is shown in those.
func (m *machine) bare(n *check.Node, f *frame) bool {
	if n.Op != check.Load {
		return false
	}
	s := m.stepFor(n.Def, f)
	return s != nil && !s.Declared && s.Unit.String() == ""
}

// named tells that a side is only a name or a literal, perhaps with a sign.
func named(n *check.Node) bool {
	if n.Op == check.Neg {
		n = n.Args[0]
	}
	return n.Op == check.Load || n.Op == check.Const
}

// utilisation is demand over capacity, the larger of a chain's; NaN where a
// ratio says nothing, be it only of the comparison that fails.
func (m *machine) utilisation(r *CheckResult, entry int) float64 {
	out, fails, told := nan, false, false
	for i, op := range r.Ops {
		a, b := r.at(i, entry), r.at(i+1, entry)
		if r.Sides[i].Value.Type.Kind != check.Number || r.Sides[i+1].Value.Type.Kind != check.Number {
			continue
		}
		failed := !compare(op, a, b)
		fails = fails || failed
		if op == syntax.Gt || op == syntax.Ge {
			a, b = b, a
		}
		if op == syntax.Eq || a <= 0 || b <= 0 || !finite(a) || !finite(b) {
			continue
		}
		if u := a / b; finite(u) {
			told = told || failed
			if !finite(out) || u > out {
				out = u
			}
		}
	}
	if fails && !told {
		return nan
	}
	return out
}

// at is the value of a side for an entry of the check.
func (r *CheckResult) at(side, entry int) float64 { return r.Sides[side].at(&r.Type, entry) }

func (s *Side) at(t *check.Type, entry int) float64 {
	v := s.Value
	if k := t.Project(entry, v.Type); k >= 0 && k < len(v.Num) {
		return v.Num[k]
	}
	return nan
}

// worst is the entry with the verdict: of the required ones one that fails
// before one that holds, and of those the largest utilisation; where none is
// required, the one that comes nearest to it.
func (r *CheckResult) worst() int {
	best := 0
	rank := func(e int) (group int, order float64) {
		switch {
		case !r.Required[e]:
			left := leastMargin(r.NeededIf, r.IfOps, &r.Type, e)
			if !finite(left) {
				left = math.Inf(-1)
			}
			return 0, left
		case !r.OK[e]:
			group = 2
		}
		if u := r.Ratio[e]; finite(u) {
			return group + 2, u
		}
		return group + 1, -leastMargin(r.Sides, r.Ops, &r.Type, e) // without a utilisation the nearest to its limit
	}
	bk, bu := rank(0)
	for e := 1; e < len(r.OK); e++ {
		if k, u := rank(e); k > bk || k == bk && u > bu && !same(u, bu) {
			best, bk, bu = e, k, u
		}
	}
	return best
}

// leastMargin is what is left between the sides of an entry, the least of a chain's; negative where it fails.
func leastMargin(sides []Side, ops []syntax.Op, t *check.Type, entry int) float64 {
	out := nan
	if len(sides) <= len(ops) {
		return out
	}
	for i, op := range ops {
		a, b := sides[i].at(t, entry), sides[i+1].at(t, entry)
		if op == syntax.Gt || op == syntax.Ge {
			a, b = b, a
		}
		left := b - a
		if op == syntax.Eq {
			left = -math.Abs(left)
		}
		if finite(left) && (!finite(out) || left < out) {
			out = left
		}
	}
	return out
}

// equalSides tells that the check fails under < or > only because its sides are equal.
func (r *CheckResult) equalSides(entry int) bool {
	if len(r.OK) == 0 || r.OK[entry] {
		return false
	}
	equal := false
	for i, op := range r.Ops {
		a, b := r.at(i, entry), r.at(i+1, entry)
		if !finite(a) || !finite(b) {
			return false
		}
		if (op == syntax.Lt || op == syntax.Gt) && same(a, b) {
			equal = true
		} else if !compare(op, a, b) {
			return false
		}
	}
	return equal
}

// Needed tells whether the check is required for any entry.
func (r *CheckResult) Needed() bool {
	for _, q := range r.Required {
		if q {
			return true
		}
	}
	return false
}
