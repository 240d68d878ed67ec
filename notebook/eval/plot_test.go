package eval_test

import (
	"math"
	"testing"
)

// What reduces rows in a calc reduces the same rows along a plot: its points
// are no rows. Each curve must meet the values that the formula has by hand.
func TestPlotReducesRowsNotPoints(t *testing.T) {
	tables := "```cases\ncase | V [kN]\nA | 10\nB | 20\n```\n```schedule bolts\nm | y [mm]\n1 | 25\n2 | 50\n```\n"
	at := func(e float64) map[string]float64 {
		return map[string]float64{
			"largest": 20 * e, "smallest": 10 * e, "total": 30 * e, "middle": 15 * e, "most": 20 * e,
			"number": e + 2, "pairs": 20 * e * 50, "each": 30 * e * 50,
		}
	}
	s := sound(t, tables+block(`
e = 100 mm
M = V*e
P = M*bolts.y
largest = max(M)/(1 kN*mm)
smallest = min(M)/(1 kN*mm)
total = sum(M)/(1 kN*mm)
middle = mean(M)/(1 kN*mm)
most = extreme(M)/(1 kN*mm)
number = e/(1 mm) + count(M)
pairs = max(P)/(1 kN*mm^2)
each = max(sum(P over cases))/(1 kN*mm^2)
`)+"```plot\nlargest, smallest, total, middle, most, number, pairs, each against e from 50 mm to 200 mm\n```\n")
	plot := s.Blocks[len(s.Blocks)-1].Plot
	if plot == nil || len(plot.Curves) != 8 {
		t.Fatalf("plot %v", plot)
	}
	for _, c := range plot.Curves {
		for i, x := range c.X {
			if want := at(x)[c.ID]; math.Abs(c.Y[i]-want) > 1e-9*want {
				t.Errorf("%s at e = %g mm: got %g, want %g", c.ID, x, c.Y[i], want)
				break
			}
		}
	}
}
