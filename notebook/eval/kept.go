package eval

import (
	"maps"
	"slices"

	"gusset/notebook/check"
)

// A reduction, a table that is interpolated and a column handed to a helper are
// wanted again for each entry of the statement that holds them. What they came
// to is kept until the next statement, so that a check over the rows of a
// schedule takes time that grows with the rows, not with their square.
type kept struct {
	columns map[*check.Node]keptColumn
	results map[*check.Node]keptResults
	runs    map[*check.Node]keptRun
}

// keptColumn is all entries of a node in one frame: a helper that is run again
// has another.
type keptColumn struct {
	frame *frame
	col   []float64
}

// keptResults are the entries of a node that were computed in one frame, nil for
// those that were not.
type keptResults struct {
	frame   *frame
	entries []any
}

// keptRun is the last run of a helper in one frame, whose result has rows of
// its own where a column went in.
type keptRun struct {
	frame *frame
	entry int // of the rows that the call runs over
	body  *frame
}

// forget drops what is kept, at the next statement.
func (k *kept) forget() {
	clear(k.columns)
	clear(k.results)
	clear(k.runs)
}

// forgetOf drops what was made of a candidate of `first of`, which gets its next
// value.
func (k *kept) forgetOf(d *check.Def) {
	forgetOf(k.columns, d)
	forgetOf(k.results, d)
	forgetOf(k.runs, d)
}

func forgetOf[T any](kept map[*check.Node]T, d *check.Def) {
	maps.DeleteFunc(kept, func(n *check.Node, _ T) bool { return mentions(n, d) })
}

// mentions tells whether an expression loads a value.
func mentions(n *check.Node, d *check.Def) bool {
	in := func(a *check.Node) bool { return mentions(a, d) }
	return n.Def == d || slices.ContainsFunc(n.Args, in) || n.Help != nil && slices.ContainsFunc(n.Help.Args, in)
}

// run runs a helper that is called inside an expression, once for all entries
// of its result that one run gives.
func (m *machine) run(n *check.Node, f *frame, entry int) (*frame, error) {
	if k, ok := m.kept.runs[n]; ok && k.frame == f && k.entry == entry && m.recording == nil {
		return k.body, nil
	}
	g, err := m.runHelper(n.Help, f, entry)
	if err == nil {
		m.kept.runs[n] = keptRun{f, entry, g}
	}
	return g, err
}

// ownColumn is a node's column over its own rows.
func (m *machine) ownColumn(n *check.Node, f *frame) []float64 {
	if n.Op == check.Load { // at hand anyway
		return m.column(n, f, &n.Type)
	}
	if k, ok := m.kept.columns[n]; ok && k.frame == f {
		return k.col
	}
	col := m.column(n, f, &n.Type)
	m.kept.columns[n] = keptColumn{f, col}
	return col
}

// once computes an entry of a node that has fewer rows than what it is wanted
// for, and hands it out again to all entries that share it. While calls are
// recorded it computes, so that they are recorded.
func (m *machine) once(n *check.Node, f *frame, target *check.Type, entry int, compute func() (any, error)) (any, error) {
	if len(n.Type.Rows) >= len(target.Rows) || m.recording != nil {
		return compute()
	}
	at := target.Project(entry, n.Type)
	if at < 0 {
		return compute()
	}
	k := m.kept.results[n]
	if k.frame != f {
		k = keptResults{f, make([]any, n.Type.Count())}
		m.kept.results[n] = k
	}
	if k.entries[at] != nil {
		return k.entries[at], nil
	}
	x, err := compute()
	if err == nil {
		k.entries[at] = x
	}
	return x, err
}
