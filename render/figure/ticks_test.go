package figure

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func labelsOf(s scale) string {
	var out []string
	for _, t := range s.ticks {
		out = append(out, s.figures(t))
	}
	return strings.Join(out, " ")
}

// Ticks are 1, 2 or 5 times a power of ten apart: common practice.
func TestTicks(t *testing.T) {
	for _, c := range []struct {
		low, high float64
		tight     bool
		most      int
		want      string
		power     int
		from, to  float64
	}{
		// Ends at ticks, at 0 where that is near.
		{19, 137, false, 6, "0 50 100 150", 0, 0, 150},
		{0, 1.2, false, 6, "0 0.2 0.4 0.6 0.8 1.0 1.2", 0, 0, 1.2},
		{0, 1, false, 6, "0 0.2 0.4 0.6 0.8 1.0", 0, 0, 1},
		{90, 101, false, 6, "90 92 94 96 98 100 102", 0, 90, 102},
		{-30, 80, false, 6, "-40 -20 0 20 40 60 80", 0, -40, 80},
		{-80, -20, false, 6, "-80 -60 -40 -20 0", 0, -80, 0},
		{0.61, 1, false, 5, "0.6 0.7 0.8 0.9 1.0", 0, 0.6, 1},
		{0, 0.0061, false, 6, "0 0.002 0.004 0.006 0.008", 0, 0, 0.008},
		// A steady value has room to both sides.
		{5, 5, false, 6, "4.4 4.6 4.8 5.0 5.2 5.4 5.6", 0, 4.4, 5.6},
		{-2, -2, false, 4, "-2.2 -2.1 -2.0 -1.9 -1.8", 0, -2.2, -1.8},
		{0, 0, false, 6, "0 1", 0, 0, 1},
		{1e-300, 2e-300, false, 6, "0 1", 0, 0, 1},
		// The range itself is the axis, ticks lie within it.
		{16, 40, true, 8, "20 25 30 35 40", 0, 16, 40},
		{50, 400, true, 8, "50 100 150 200 250 300 350 400", 0, 50, 400},
		{0.3, 0.7, true, 5, "0.3 0.4 0.5 0.6 0.7", 0, 0.3, 0.7},
		{-1.5, 1.5, true, 6, "-1.5 -1.0 -0.5 0 0.5 1.0 1.5", 0, -1.5, 1.5},
		// Powers of ten go to the title in threes.
		{0, 2.1e5, false, 6, "0 50 100 150 200 250", 3, 0, 250},
		{0, 99_999, false, 5, "0 20000 40000 60000 80000 100000", 0, 0, 100_000},
		{0, 6.036e-4, false, 6, "0 200 400 600 800", -6, 0, 800},
		{1e6, 3e6, true, 4, "1.0 1.5 2.0 2.5 3.0", 6, 1, 3},
		{0, 1e300, false, 5, "0.0 0.2 0.4 0.6 0.8 1.0", 300, 0, 1},
		{-1.7e308, 1.7e308, false, 4, "-200 -100 0 100 200", 306, -200, 200},
		{0, 3e-289, false, 6, "0 50 100 150 200 250 300", -291, 0, 300},
	} {
		s := newScale([2]float64{c.low, c.high}, c.tight, c.most)
		if got := labelsOf(s); strings.ReplaceAll(got, "0.0 ", "0 ") != strings.ReplaceAll(c.want, "0.0 ", "0 ") || s.power != c.power {
			t.Errorf("%g to %g: %s ×10^%d, want %s ×10^%d", c.low, c.high, got, s.power, c.want, c.power)
		}
		if math.Abs(s.low-c.from) > 1e-9*math.Abs(c.to) || math.Abs(s.high-c.to) > 1e-9*math.Abs(c.to) {
			t.Errorf("%g to %g: the axis runs from %g to %g, want %g to %g", c.low, c.high, s.low, s.high, c.from, c.to)
		}
	}
}

// A circle is parted into halves, quarters, eighths, twelfths: common practice.
func TestTicksInDegrees(t *testing.T) {
	for _, c := range []struct {
		unit      string
		low, high float64
		tight     bool
		most      int
		want      string
		from, to  float64
	}{
		{"deg", 0, 180, true, 8, "0 30 60 90 120 150 180", 0, 180},
		{"deg", 0, 90, true, 8, "0 15 30 45 60 75 90", 0, 90},
		{"deg", 0, 360, true, 8, "0 45 90 135 180 225 270 315 360", 0, 360},
		{"deg", -180, 180, true, 6, "-180 -90 0 90 180", -180, 180},
		{"deg", 10, 170, true, 6, "30 60 90 120 150", 10, 170},
		{"deg", 5, 110, false, 6, "0 30 60 90 120", 0, 120},
		{"deg", 0, 1440, true, 8, "0 180 360 540 720 900 1080 1260 1440", 0, 1440},
		// Less than a quarter turn, other units and very many turns go by tens.
		{"deg", 0, 80, true, 8, "0 10 20 30 40 50 60 70 80", 0, 80},
		{"mm", 0, 180, true, 6, "0 50 100 150", 0, 180},
		{"deg", 0, 9000, true, 5, "0 2000 4000 6000 8000", 0, 9000},
	} {
		s := scaleIn(unitOf(t, c.unit), [2]float64{c.low, c.high}, c.tight, c.most)
		if got := labelsOf(s); got != c.want || s.low != c.from || s.high != c.to {
			t.Errorf("%g to %g %s: %s from %g to %g, want %s from %g to %g", c.low, c.high, c.unit, got, s.low, s.high, c.want, c.from, c.to)
		}
	}
	rapid.Check(t, func(rt *rapid.T) {
		a, b := anyNumber().Draw(rt, "a"), anyNumber().Draw(rt, "b")
		s := scaleIn(unitOf(t, "deg"), [2]float64{math.Min(a, b), math.Max(a, b)}, rapid.Bool().Draw(rt, "tight"), rapid.IntRange(2, 8).Draw(rt, "most"))
		if len(s.ticks) == 0 || len(s.ticks) > 12 || !(s.high > s.low) {
			rt.Fatalf("%d ticks from %g to %g", len(s.ticks), s.low, s.high)
		}
	})
}

func anyNumber() *rapid.Generator[float64] {
	return rapid.OneOf(
		rapid.Float64Range(-1e3, 1e3), rapid.Float64(), rapid.Float64Range(-1e-6, 1e-6),
		rapid.SampledFrom([]float64{0, 1, -1, 1e-300, 5e-324, 1.7e308, -1.7e308, 1e300, 1e15, 1e-15}),
	)
}

// Whatever the range: the axis holds it, the ticks lie within the axis, in
// order, few, and print differently.
func TestTicksOfAnyRange(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a, b := anyNumber().Draw(t, "a"), anyNumber().Draw(t, "b")
		low, high := math.Min(a, b), math.Max(a, b)
		tight, most := rapid.Bool().Draw(t, "tight"), rapid.IntRange(2, 8).Draw(t, "most")
		s := newScale([2]float64{low, high}, tight, most)
		const dust = 1e-6
		for _, x := range []float64{low, high} {
			if u := s.at(x); !(u >= -dust && u <= 1+dust) && math.Max(math.Abs(low), math.Abs(high)) > vanishing {
				t.Fatalf("%g lies at %g of the axis from %g to %g ×10^%d", x, u, s.low, s.high, s.power)
			}
		}
		if len(s.ticks) == 0 || len(s.ticks) > most+4 {
			t.Fatalf("%d ticks", len(s.ticks))
		}
		for i, v := range s.ticks {
			if u := s.along(v); !(u >= -dust && u <= 1+dust) {
				t.Fatalf("tick %g lies at %g", v, u)
			}
			if i > 0 && (v <= s.ticks[i-1] || s.figures(v) == s.figures(s.ticks[i-1])) {
				t.Fatalf("ticks %s and %s", s.figures(s.ticks[i-1]), s.figures(v))
			}
			if len(s.figures(v)) > 16 {
				t.Fatalf("tick %s is long", s.figures(v))
			}
		}
	})
}

func TestStepOf(t *testing.T) {
	for _, c := range []struct{ x, want float64 }{
		{1, 1}, {1.01, 2}, {2, 2}, {2.1, 5}, {5, 5}, {5.1, 10}, {9.9, 10}, {0.03, 0.05}, {0.1, 0.1}, {123, 200}, {1e-7, 1e-7},
	} {
		exponent, mantissa := stepOf(c.x)
		if got := shifted(mantissa, exponent); math.Abs(got-c.want) > 1e-12*c.want {
			t.Errorf("%g: %g, want %g", c.x, got, c.want)
		}
	}
}

func TestExaggeration(t *testing.T) {
	for _, c := range []struct{ angle, want float64 }{
		{0, 1}, {0.08, 1}, {-0.3, 1}, {0.6, 1}, {0.07, 5}, {0.036, 10}, {6.036e-4, 500}, {-1e-3, 200}, {1e-9, 2e8}, {0.9, 0.2}, {1.5, 0.2}, {40, 0.005},
	} {
		if got := exaggeration(c.angle); math.Abs(got-c.want) > 1e-9*c.want {
			t.Errorf("%g: drawn %g times as large, want %g", c.angle, got, c.want)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		angle := anyNumber().Draw(t, "angle")
		if math.Abs(angle) > largestAngle {
			return
		}
		if drawn := math.Abs(angle) * exaggeration(angle); drawn > 0.6+1e-9 || math.Abs(angle) > vanishing && drawn < 0.08 {
			t.Fatalf("%g is drawn as %g", angle, drawn)
		}
	})
}
