package eval

import (
	"slices"
	"sort"

	"gusset/notebook/check"
)

// place is an entry of some rows: where a check, or what picks from rows, looks.
type place struct {
	t     check.Type
	entry int
}

// govern finds for every value over rows the entry that governs the check
// downstream of it: that of the worst such check.
func (m *machine) govern(steps []*Step) {
	g := governing{m: m, steps: steps, byStep: map[*Step]int{}, done: make([]bool, len(steps))}
	var checks []int
	for i, s := range steps {
		if s == nil {
			g.done[i] = true
			continue
		}
		g.done[i] = s.Kind == Check
		g.byStep[s] = i
		for _, r := range s.Results {
			g.byStep[r] = i
		}
		if s.Kind == Check && !s.Failed && s.Check.Needed() {
			checks = append(checks, i)
		}
	}
	sort.SliceStable(checks, func(a, b int) bool { return worse(steps[checks[a]].Check, steps[checks[b]].Check) })
	m.quietly(func() {
		for _, i := range checks {
			r := steps[i].Check
			g.spread(i, place{r.Type, r.Governs})
		}
	}, func() {})
	m.running = nil
}

// governing is what is known while the checks are followed upstream, the worst first.
type governing struct {
	m      *machine
	steps  []*Step
	byStep map[*Step]int
	done   []bool // by step: its entry is found
	walks  []*walk
}

// walk is what has been reached upstream with a place in one list of rows. What
// a worse check has been through already, with all above it, holds nothing for
// the next one: chains of checks stay linear.
type walk struct {
	rows []*check.Rows
	seen []bool // by step
}

// first tells whether a step is reached by such a place for the first time.
func (g *governing) first(k int, at place) bool {
	i := slices.IndexFunc(g.walks, func(w *walk) bool { return slices.Equal(w.rows, at.t.Rows) })
	if i < 0 {
		i = len(g.walks)
		g.walks = append(g.walks, &walk{rows: at.t.Rows, seen: make([]bool, len(g.steps))})
	}
	was := g.walks[i].seen[k]
	g.walks[i].seen[k] = true
	return !was
}

func worse(a, b *CheckResult) bool {
	if a.AllOK != b.AllOK {
		return !a.AllOK
	}
	x, y := a.Ratio[a.Governs], b.Ratio[b.Governs]
	return finite(x) && (!finite(y) || x > y)
}

// spread gives everything upstream of a check, as far as values run over rows,
// the entry that governs it. A plain value says nothing of the rows that it was
// reduced from, unless it was picked from one of them.
func (g *governing) spread(from int, at place) {
	type visit struct {
		step int
		at   place
	}
	g.first(from, at)
	stack := []visit{{from, at}}
	for len(stack) > 0 {
		v := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		picked := g.m.pickedFrom(g.m.prog.Plans[v.step], g.steps[v.step], v.at)
		for _, u := range g.steps[v.step].Uses {
			k, ok := g.byStep[u]
			if !ok {
				continue
			}
			at, ok := picked[u]
			if !ok {
				at = v.at
			}
			if plainValue(g.steps[k]) {
				at = place{}
			} else if len(at.t.Rows) == 0 {
				continue
			}
			if !g.first(k, at) {
				continue
			}
			stack = append(stack, visit{k, at})
			if !g.done[k] {
				g.done[k] = setEntry(g.steps[k], at)
			}
		}
	}
}

// plainValue tells that a step has one value for all rows.
func plainValue(s *Step) bool {
	if s.Kind == Function || len(s.Value.Type.Rows) > 0 {
		return false
	}
	for _, r := range s.Results {
		if len(r.Value.Type.Rows) > 0 {
			return false
		}
	}
	return true
}

// setEntry sets the entry printed in full, where a place says which.
func setEntry(s *Step, at place) bool {
	set := false
	one := func(s *Step) {
		if len(s.Value.Type.Rows) == 0 || s.Value.Len() == 0 {
			return
		}
		if e := at.t.Project(at.entry, s.Value.Type); e >= 0 {
			s.Entry, set = e, true
		}
	}
	one(s)
	for _, r := range s.Results {
		one(r)
	}
	return set
}

// pickedFrom finds the entries that a statement picked from rows for its own
// entry: by min, max and extreme, and by `first of`. What it uses beside them
// too is not among them.
func (m *machine) pickedFrom(p *check.Plan, s *Step, at place) map[*Step]place {
	if p == nil || s.Failed || p.Column != nil {
		return nil
	}
	picks := picking{m: m, direct: map[*Step]bool{}}
	m.running = p
	m.kept.forget()
	switch {
	case p.Check != nil:
		picks.node(p.Check.Cond, at)
	case p.Helper != nil:
		picks.nodes(p.Helper.Args, at)
	case p.Choice.FirstOf != nil:
		picks.firstOf(p.Choice.FirstOf, s, at)
	default:
		picks.branches(p.Choice.Branches, s, at)
	}
	for u := range picks.direct {
		delete(picks.out, u)
	}
	return picks.out
}

// picking collects what one statement picked from rows.
type picking struct {
	m      *machine
	within bool // a reduction that picks
	direct map[*Step]bool
	out    map[*Step]place
}

func (k *picking) nodes(nodes []*check.Node, at place) {
	for _, n := range nodes {
		k.node(n, at)
	}
}

func (k *picking) node(n *check.Node, at place) {
	if n == nil {
		return
	}
	if n.Op == check.Load {
		k.load(n, at)
		return
	}
	if n.Op == check.Reduce && (n.Fn == "min" || n.Fn == "max" || n.Fn == "extreme") {
		if in, ok := k.m.reducedTo(n, at); ok {
			outer := k.within
			k.within = true
			k.node(n.Args[0], in)
			k.within = outer
			return
		}
	}
	k.nodes(n.Args, at)
	if n.Op == check.CallHelp && n.Help != nil {
		k.nodes(n.Help.Args, at)
	}
}

func (k *picking) load(n *check.Node, at place) {
	if n.Def == nil || n.Def.IsConst || n.Def.Scope != k.m.top.scope {
		return
	}
	u := k.m.top.steps[n.Def.Slot]
	switch {
	case u == nil:
	case !k.within:
		k.direct[u] = true
	default:
		if _, twice := k.out[u]; !twice {
			if k.out == nil {
				k.out = map[*Step]place{}
			}
			k.out[u] = at
		}
	}
}

// branches goes through the conditions up to the branch that was taken for the
// entry, and its value.
func (k *picking) branches(branches []check.Branch, s *Step, at place) {
	taken := len(branches) - 1
	if e := at.t.Project(at.entry, s.Value.Type); e >= 0 && e < len(s.Taken) {
		taken = s.Taken[e]
	}
	for i, b := range branches {
		if k.node(b.Cond, at); i == taken {
			k.node(b.Value, at)
			return
		}
	}
}

// firstOf takes the row of the column that was picked for the entry, and looks
// at the condition with the candidate that was.
func (k *picking) firstOf(fo *check.FirstOf, s *Step, at place) {
	k.nodes(fo.Values, at)
	if e := at.t.Project(at.entry, s.Value.Type); e >= 0 {
		k.m.top.vals[fo.Def.Slot] = s.Value.one(e)
		if fo.Column != nil && e < len(s.Picks) {
			k.within = true
			k.node(fo.Column, place{check.Type{Rows: []*check.Rows{fo.Rows}}, s.Picks[e]})
			k.within = false
		}
	}
	k.node(fo.Cond, at)
}

// reducedTo finds the entry of its argument that a min, max or extreme took for
// a place: the first of equal ones.
func (m *machine) reducedTo(n *check.Node, at place) (place, bool) {
	arg := n.Args[0]
	if !slices.ContainsFunc(arg.Type.Rows, func(r *check.Rows) bool { return slices.Contains(n.Over, r) }) {
		return place{}, false
	}
	for _, r := range arg.Type.Rows {
		if !slices.Contains(n.Over, r) && !slices.Contains(at.t.Rows, r) {
			return place{}, false
		}
	}
	col := m.ownColumn(arg, m.top)
	entries := entriesOf(&arg.Type, n.Over, &at.t, at.entry)
	r := reduce(n.Fn, len(entries), func(i int) float64 { return col[entries[i]] })
	for _, e := range entries {
		if same(col[e], r) {
			return place{check.Type{Rows: arg.Type.Rows}, e}, true
		}
	}
	return place{}, false
}
