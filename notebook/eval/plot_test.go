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

// A curve breaks where it goes through infinity between two points, or on one,
// and nowhere else: not at a jump, a steep peak or a place that is only left out.
func TestPlotBreaks(t *testing.T) {
	for _, c := range []struct {
		formula, plot string
		want          []float64 // where it breaks
	}{
		{"v = 1 mm/(d - 30 mm)", "from 16 mm to 41 mm", []float64{30}},
		{"v = 1 mm/(d - 30 mm)", "from 16 mm to 40 mm steps 24", []float64{30}},
		{"v = 1 mm/(d - 30.02 mm)", "from 16 mm to 40 mm", []float64{30.02}},
		{"v = 1 mm/(d - 30 mm)", "from 30.1 mm to 40 mm", nil},
		{"v = 1 mm^2/(d - 30 mm)^2", "from 16 mm to 41 mm", []float64{30}},
		{"v = 1/sqrt(abs(d/(1 mm) - 30))", "from 16 mm to 41 mm", []float64{30}},
		{"v = tan(d/(1 mm))", "from 1 mm to 8 mm", []float64{math.Pi / 2, 3 * math.Pi / 2, 5 * math.Pi / 2}},
		{"v = 1 mm/(d - 30 mm) + 1 mm/(d - 35 mm)", "from 16 mm to 41.3 mm", []float64{30, 35}},
		{"w = d - 30 mm\nv = 1 mm * w/(w^2 + (0.001 mm)^2)", "from 16 mm to 41 mm", nil},
		{"v = 1 if d < 30 mm\n  = -1 otherwise", "from 16 mm to 41 mm", nil},
		{"v = floor(d/(3 mm)) - d/(3 mm) - 0.5", "from 16 mm to 41 mm", nil},
		{"w = d - 30 mm\nv = sin(w/(1 mm))/(w/(1 mm))", "from 16 mm to 44 mm steps 28", nil},
		{"v = exp(d/(1 mm))", "from 16 mm to 41 mm", nil},
		{"v = d/(1 mm)", "from 16 mm to 41 mm steps 1", nil},
	} {
		s := sound(t, block("d = 20 mm\n"+c.formula)+"```plot\nv against d "+c.plot+"\n```\n")
		p := s.Blocks[len(s.Blocks)-1].Plot
		if p == nil {
			t.Errorf("%s %s: no plot", c.formula, c.plot)
			continue
		}
		curve := p.Curves[0]
		good := len(curve.Breaks) == len(c.want)
		for k := 0; good && k < len(c.want); k++ {
			i := curve.Breaks[k]
			good = curve.X[i] <= c.want[k] && c.want[k] <= curve.X[i+1]
		}
		if !good {
			t.Errorf("%s %s: breaks %v, want at %v", c.formula, c.plot, curve.Breaks, c.want)
		}
	}
	if s := compile(t, block("d = 40 mm\nv = sqrt(d/(1 mm) - 30)")+"```plot\nv against d from 16 mm to 41 mm\n```\n"); !s.Failed() {
		t.Error("a curve is drawn where it has no value over half of its range")
	}
}
