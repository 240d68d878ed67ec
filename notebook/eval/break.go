package eval

import (
	"math"

	"gusset/notebook/check"
)

// A curve that goes through infinity between two of its points, as 1/(d - 30 mm)
// does at 30 mm, must not be joined there: a line from the one branch to the
// other would show values that the formula never has. Such a place shows by the
// magnitudes, which grow ever faster towards it from both sides. Whether it is
// one, or only a steep peak, is found by computing the curve there again, closer
// and closer: the magnitude of a peak settles, the other outgrows any bound.

// breaks finds the breaks of a plot's curves.
type breaks struct {
	m     *machine
	p     *check.PlotPlan
	x     []float64 // the points
	looks int
	swept int
}

const (
	mostLooks = 50        // places of a plot that are looked into
	mostSwept = 5_000_000 // entries that are computed again for it
	closest   = 1e-6      // of the distance of two points, how closely
	steeper   = 1.5       // towards a pole the rise is at least 3 times the one before, with roots twice
	outgrown  = 100       // times the magnitude at the points is no peak
)

// of lists the breaks of a curve with the values y. at is where its points stand
// among the entries of the swept value.
func (b *breaks) of(y []float64, swept *check.Def, at func(i int) int) []int {
	var list []int
	for i := 0; i+1 < len(y); i++ {
		if b.looks < mostLooks && b.suspect(y, i) {
			b.looks++
			if b.endless(y, i, swept, at) {
				list = append(list, i)
			}
		}
	}
	return list
}

// entries counts what a statement computes: for a helper with several results
// its lines, each time that it runs.
func entries(p *check.Plan) int {
	switch {
	case p.Helper != nil:
		return check.Type{Rows: p.Helper.Loop}.Count() * len(p.Helper.Plans)
	case p.Def != nil:
		return p.Def.Type.Count()
	}
	return 0
}

// suspect tells that the magnitudes grow towards the place behind point i, and
// ever faster, from those sides where there are points enough to say so.
func (b *breaks) suspect(y []float64, i int) bool {
	rise := func(near, far int) float64 {
		return (math.Abs(y[near]) - math.Abs(y[far])) / math.Abs(b.x[near]-b.x[far])
	}
	sides := 0
	for _, side := range [2][3]int{{i, i - 1, i - 2}, {i + 1, i + 2, i + 3}} {
		near, next, far := side[0], side[1], side[2]
		if far < 0 || far >= len(y) {
			continue
		}
		if r := rise(near, next); r <= 0 || r <= steeper*rise(next, far) {
			return false
		}
		sides++
	}
	return sides > 0
}

// endless tells whether the curve goes through infinity behind point i.
func (b *breaks) endless(y []float64, i int, swept *check.Def, at func(i int) int) bool {
	lo, hi := b.x[i], b.x[i+1]
	width, bound := (hi-lo)*closest, outgrown*math.Max(math.Abs(y[i]), math.Abs(y[i+1]))
	n := len(b.x) - 1
	for hi-lo > width && b.swept < mostSwept {
		for _, plan := range b.p.Plans {
			b.swept += entries(plan)
		}
		x := make([]float64, n+1)
		for k := range x {
			x[k] = lo + (hi-lo)*float64(k)/float64(n)
		}
		f, err := b.m.sweep(b.p, x)
		if err != nil {
			return true // there is no value there
		}
		v, err := f.value(swept)
		if err != nil {
			return true
		}
		top := 0
		for k := range x {
			z := math.Abs(v.Num[at(k)])
			if z > bound || !finite(z) {
				return true
			}
			if z > math.Abs(v.Num[at(top)]) {
				top = k
			}
		}
		from, to := x[max(top-1, 0)], x[min(top+1, n)]
		if to-from >= hi-lo {
			return false // no closer look with so few points, or figures
		}
		lo, hi = from, to
	}
	return false
}
