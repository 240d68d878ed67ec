package check

import (
	"fmt"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// PlotPlan is a plot ready to be computed. What lies between the swept name and the
// curves is lowered anew, with the swept name a value over the points of the
// range: every statement that does not depend on it is computed once.
type PlotPlan struct {
	Tree   *syntax.Plot
	Swept  *Def  // the calc's own value
	Point  *Def  // what stands for it over the range
	Rows   *Rows // the points; their marks are set when the range is known
	From   *Node
	To     *Node
	Scope  *Scope
	Plans  []*Plan // what is computed again, in order
	Curves []PlotCurve
	Limits []PlotCurve
	Failed bool
}

// PlotCurve is one curve: the calc's own value and what it is over the range.
type PlotCurve struct {
	Def   *Def
	Swept *Def // Def itself where it does not depend on the swept name
}

// The points of a plot.
const (
	plotSteps    = 200
	maxPlotSteps = 10_000
)

func (c *checker) plot(block int, t *syntax.Plot) {
	plan := &PlotPlan{Tree: t}
	c.prog.Plots[block] = plan
	l := &lower{e: c.top, uses: make([]*Def, t.Slots), declared: true}
	switch {
	case t.Checks:
		c.plotChecks(l, t)
	case t.Against == nil || t.From == nil || t.To == nil: // reported where it was read
		plan.Failed = true
		return
	default:
		c.sweep(l, plan, t)
	}
	plan.Failed = l.failed
}

// plotChecks refuses a plot of checks that would stay empty, and one that asks
// for curves too.
func (c *checker) plotChecks(l *lower, t *syntax.Plot) {
	if t.Against != nil || len(t.Limits) > 0 {
		l.fail(diag.Syntax, t.At, "a plot of checks draws nothing else", "curves stand in a plot of their own")
		return
	}
	for _, p := range c.prog.Plans {
		if _, ok := p.Stmt.(*syntax.Check); ok {
			return
		}
	}
	l.fail(diag.UnknownName, t.At, "there are no checks in this file to plot")
}

func (c *checker) sweep(l *lower, plan *PlotPlan, t *syntax.Plot) {
	plan.Swept = l.sweptName(t)
	if plan.Swept == nil {
		return
	}
	d := plan.Swept
	plan.From, plan.To = l.bound(t.From, d), l.bound(t.To, d)
	if l.failed {
		return
	}
	steps := t.Steps
	if steps == 0 {
		steps = plotSteps
	}
	if steps > maxPlotSteps {
		l.fail(diag.BoundExceeded, t.At, fmt.Sprintf("a plot has at most %d steps", maxPlotSteps))
		return
	}
	plan.Rows = &Rows{Name: d.Symbol, File: c.in.Source.Name, Marks: make([]string, steps+1), Swept: true}
	c.order[plan.Rows] = len(c.order)
	s := &sweeper{c: c, plan: plan, dirty: map[*Def]bool{d: true}, funcs: map[string]bool{}}
	s.overlay(t)
	s.need(t)
	if !s.relower() {
		l.failed = true
		return
	}
	for _, n := range t.Curves {
		l.curve(n, s, true, &plan.Curves)
	}
	for _, n := range t.Limits {
		l.curve(n, s, false, &plan.Limits)
	}
}

// sweptName finds the value that a plot runs along its axis.
func (l *lower) sweptName(t *syntax.Plot) *Def {
	n := l.name(t.Against)
	if !n.ok() {
		return nil
	}
	switch {
	case !drawn(n.Type) || n.Def.IsConst:
		l.fail(diag.DimensionMismatch, t.Against.At, fmt.Sprintf("a plot runs along a number, but %s is %s", t.Against.Text, l.e.c.describe(n.Type)))
	case len(n.Type.Rows) > 0:
		l.fail(diag.RowMismatch, t.Against.At, fmt.Sprintf("a plot runs along a plain value, but %s is %s", t.Against.Text, l.e.c.rowWords(n.Type)))
	default:
		return n.Def
	}
	return nil
}

// drawn tells that an axis may carry a value: a number or a temperature.
func drawn(t Type) bool { return t.Kind == Number || t.Kind == Point }

func (l *lower) bound(x syntax.Expr, d *Def) *Node {
	n := l.value(x)
	if !n.ok() {
		return n
	}
	if len(n.Type.Rows) > 0 {
		return l.fail(diag.RowMismatch, x.Span(), fmt.Sprintf("a bound of the range is a plain value, but `%s` is %s", l.print(x), l.e.c.rowWords(n.Type)))
	}
	if n.zero && l.noZero(d.Type, x) {
		return invalid
	}
	if !n.zero && (n.Type.Dim != d.Type.Dim || n.Type.Kind != d.Type.Kind) {
		l.mismatch(x.Span(), fmt.Sprintf("the range of %s is %s, but `%s` is %s", d.Symbol, l.e.c.describe(d.Type), l.print(x), l.e.c.describe(n.Type)), d.Type, n.Type)
		return invalid
	}
	return l.askFreq(x, n, d.Type.Freq, fmt.Sprintf("%s is in %s", d.Symbol, d.Type.Freq.words()))
}

// curve enters one curve or limit, all of one dimension.
func (l *lower) curve(x *syntax.Name, s *sweeper, mustMove bool, out *[]PlotCurve) {
	n := l.name(x)
	if !n.ok() {
		return
	}
	if !drawn(n.Type) {
		l.fail(diag.DimensionMismatch, x.At, fmt.Sprintf("a plot draws numbers, but %s is %s", x.Text, l.e.c.describe(n.Type)))
		return
	}
	if first := s.plan.Curves; len(first) > 0 && (first[0].Def.Type.Dim != n.Type.Dim || first[0].Def.Type.Kind != n.Type.Kind) {
		l.mismatch(x.At, fmt.Sprintf("one axis carries one dimension: %s is %s, but %s is %s", first[0].Def.Symbol, l.e.c.describe(first[0].Def.Type), x.Text, l.e.c.describe(n.Type)),
			first[0].Def.Type, n.Type)
		return
	}
	swept := n.Def
	if d := s.e.names[n.Def.ID]; d != nil {
		swept = d
	} else if mustMove && n.Def != s.plan.Swept {
		hint := "a value that stays the same is drawn with `limit " + x.Text + "`"
		if s.plan.Swept.Carry != nil {
			hint = "what was carried from another calc is not computed again: draw it in a plot of that calc"
		}
		l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s does not depend on %s: there is nothing to plot", x.Text, s.plan.Swept.Symbol), hint)
		return
	}
	if swept.Failed {
		l.depend(swept.Because)
		return
	}
	*out = append(*out, PlotCurve{Def: n.Def, Swept: swept})
}

// sweeper lowers anew what depends on the swept name.
type sweeper struct {
	c     *checker
	plan  *PlotPlan
	e     *env
	body  *body
	dirty map[*Def]bool   // the calc's own values that depend on it
	funcs map[string]bool // the author's functions that do
	// needed are the statements that the curves and limits are made from.
	needed map[*Plan]bool
}

// need finds what lies upstream of the curves and limits, from the last
// statement to the first.
func (s *sweeper) need(t *syntax.Plot) {
	s.needed = map[*Plan]bool{}
	defs, calls := map[*Def]bool{}, map[string]bool{}
	for _, names := range [][]*syntax.Name{t.Curves, t.Limits} {
		for _, n := range names {
			defs[s.c.top.lookup(n.ID)] = true
		}
	}
	plans := s.c.prog.Plans
	for i := len(plans) - 1; i >= 0; i-- {
		p := plans[i]
		def, _ := p.Stmt.(*syntax.Definition)
		wanted := p.Def != nil && defs[p.Def] || p.Func && calls[def.Name.ID]
		if p.Def != nil {
			for _, r := range p.Def.Results {
				wanted = wanted || defs[r]
			}
		}
		if !wanted {
			continue
		}
		s.needed[p] = true
		for _, u := range p.Uses {
			defs[u] = true
		}
		if p.Column != nil {
			for _, cell := range p.Column.Uses {
				for _, u := range cell {
					defs[u] = true
				}
			}
		}
		eachCall(def, func(id string) { calls[id] = true })
	}
}

// eachCall visits the functions that a definition's right side calls.
func eachCall(def *syntax.Definition, f func(id string)) {
	if def == nil {
		return
	}
	for i := range def.Branches {
		for _, x := range []syntax.Expr{def.Branches[i].Value, def.Branches[i].Cond} {
			if x == nil {
				continue
			}
			syntax.Walk(x, func(e syntax.Expr) bool {
				if call, ok := e.(*syntax.Call); ok {
					f(call.Fun.ID)
				}
				return true
			})
		}
	}
}

func (s *sweeper) overlay(t *syntax.Plot) {
	c, d := s.c, s.plan.Swept
	s.plan.Scope = &Scope{Parent: c.prog.Scope}
	s.e = &env{c: c, src: c.in.Source, scope: s.plan.Scope, names: map[string]*Def{}, funcs: map[string]*function{}, parent: c.top}
	p := *d
	p.Scope, p.Slot, p.Type.Rows = s.plan.Scope, s.plan.Scope.newSlot(), []*Rows{s.plan.Rows}
	p.Literal, p.Plan, p.exact, p.plain = nil, nil, nil, false
	if p.Picked != nil { // no point of the range was picked from a row
		p.Picked = s.plan.Rows
	}
	s.plan.Point = &p
	s.e.names[d.ID] = &p
	s.body = &body{c: c, e: s.e, site: &t.At, siteIn: c.top, inside: "the plot"}
}

// relower lowers the statements below the swept name that depend on it.
func (s *sweeper) relower() bool {
	c := s.c
	before := len(c.prog.Diagnostics)
	for _, p := range c.prog.Plans {
		def, ok := p.Stmt.(*syntax.Definition)
		if p.Failed || !s.needed[p] || p.Def == s.plan.Swept || !ok && p.Column == nil || ok && !s.depends(p, def) {
			continue
		}
		if p.Column != nil {
			s.column(p)
			continue
		}
		if p.Func {
			s.funcs[def.Name.ID] = true
			s.e.funcs[def.Name.ID] = &function{def: def, env: s.e, line: p.Line, uses: map[string]*Function{}, wrong: map[string]*diag.Span{}}
			continue
		}
		s.dirty[p.Def] = true
		for _, r := range p.Def.Results {
			s.dirty[r] = true
		}
		s.body.definition(def)
	}
	// Warnings about these lines were given where they stand.
	kept := c.prog.Diagnostics[:before]
	sound := true
	for _, d := range c.prog.Diagnostics[before:] {
		if d.Severity == diag.Error {
			kept = append(kept, d)
			sound = false
		}
	}
	c.prog.Diagnostics = kept
	s.plan.Plans = s.body.plans
	return sound
}

// column refuses a schedule whose cells depend on the swept name.
func (s *sweeper) column(p *Plan) {
	for _, uses := range p.Column.Uses {
		for _, d := range uses {
			if d != nil && s.dirty[d] {
				s.c.report(diag.Diagnostic{ID: diag.RowMismatch, Source: s.c.in.Source, Span: s.plan.Tree.Against.At,
					Message: fmt.Sprintf("the column %s depends on %s in its cells, and a schedule's cells are not swept", p.Def.Symbol, s.plan.Swept.Symbol),
					Hints:   []string{"a formula of rows below the schedule is swept: write there what depends on " + s.plan.Swept.Symbol}})
				return
			}
		}
	}
}

func (s *sweeper) depends(p *Plan, def *syntax.Definition) bool {
	for _, d := range p.Uses {
		if d != nil && s.dirty[d] {
			return true
		}
	}
	found := false
	eachCall(def, func(id string) { found = found || s.funcs[id] })
	return found
}
