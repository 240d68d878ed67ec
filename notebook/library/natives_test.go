package library

import (
	"math"
	"slices"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

// The series against its own other form: expanded along the other side, it gives the same torsion
// constant, k_1(s)·s = k_1(1/s)·(1/s)^-1 as of a·b³. That form is added up term by term.
func TestSaintVenantAlongTheOtherSide(t *testing.T) {
	other := func(s float64) float64 {
		sum := 0.0
		for n := 400001.0; n > 0; n -= 2 { // the small terms first
			sum += math.Tanh(n*math.Pi/(2*s)) / math.Pow(n, 5)
		}
		return s * s / 3 * (1 - 192*s/math.Pow(math.Pi, 5)*sum)
	}
	for _, s := range []float64{1, 1.2, 1.5, 2, 3, 5, 10, 20} {
		k1, err := saintVenantK1(s)
		if err != nil || math.Abs(k1-other(s)) > 1e-9 {
			t.Errorf("k_1(%g) = %.12f, along the other side %.12f (%v)", s, k1, other(s), err)
		}
	}
}

// The stress in the middle of the longer side from the series along the other side, whose terms alternate.
func TestSaintVenantStressAlongTheOtherSide(t *testing.T) {
	for _, s := range []float64{1, 1.5, 2, 3, 5} {
		// tau/(G·theta'·b) = s·8/pi²·sum (-1)^((n-1)/2)/n²·tanh(n·pi/(2·s)), the average of two partial sums
		sum, last := 0.0, 0.0
		for n, sign := 1.0, 1.0; n < 400000; n, sign = n+2, -sign {
			last = sign / (n * n) * math.Tanh(n*math.Pi/(2*s))
			sum += last
		}
		slope := s * 8 / (math.Pi * math.Pi) * (sum - last/2)
		k1, _ := saintVenantK1(s)
		k2, err := saintVenantK2(s)
		if err != nil || math.Abs(k2-k1/slope) > 1e-9 {
			t.Errorf("k_2(%g) = %.12f, along the other side %.12f (%v)", s, k2, k1/slope, err)
		}
	}
}

func TestSaintVenantLimits(t *testing.T) {
	for _, f := range []func(float64) (float64, error){saintVenantK1, saintVenantK2} {
		if k, err := f(1e9); err != nil || math.Abs(k-1.0/3) > 1e-9 {
			t.Errorf("a thin strip has 1/3, not %g (%v)", k, err)
		}
		for _, s := range []float64{0.999, 0, -1, math.NaN()} {
			if k, err := f(s); err == nil {
				t.Errorf("a ratio of %g gives %g", s, k)
			}
		}
	}
	if r, err := saintVenantRest(1); err != nil || !(r > 0 && r < 1e-15) {
		t.Errorf("the rest for a square is %g (%v)", r, err)
	}
	if _, err := saintVenantRest(0.5); err == nil {
		t.Error("the rest has no limit")
	}
}

// The eigenvalues against the closed cubic (Cardano's with a cosine).
func TestPrincipalStressesAgainstTheCubic(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var s [6]float64
		for i := range s {
			s[i] = rapid.Float64Range(-500e6, 500e6).Draw(t, "stress")
		}
		x, y, z, xy, yz, zx := s[0], s[1], s[2], s[3], s[4], s[5]
		m := (x + y + z) / 3
		a, b, c := x-m, y-m, z-m
		j2 := (a*a+b*b+c*c)/2 + xy*xy + yz*yz + zx*zx
		j3 := mat.Det(mat.NewDense(3, 3, []float64{a, xy, zx, xy, b, yz, zx, yz, c}))
		if j2 < 1 {
			return
		}
		angle := math.Acos(max(-1, min(1, 3*math.Sqrt(3)/2*j3/math.Pow(j2, 1.5)))) / 3
		want := make([]float64, 3)
		for k := range want {
			want[k] = m + 2*math.Sqrt(j2/3)*math.Cos(angle-float64(k)*2*math.Pi/3)
		}
		slices.Sort(want)
		for k := 1; k <= 3; k++ {
			got, err := principalStress([][]float64{{float64(k)}, {x}, {y}, {z}, {xy}, {yz}, {zx}})
			// the cosine loses half the figures where two roots meet
			if err != nil || math.Abs(got-want[3-k]) > 1e-7*(math.Sqrt(j2)+math.Abs(m)) {
				t.Fatalf("principal stress %d is %g, by the cubic %g (%v)", k, got, want[3-k], err)
			}
		}
	})
	if _, err := principalStress([][]float64{{4}, {0}, {0}, {0}, {0}, {0}, {0}}); err == nil {
		t.Error("there is a fourth principal stress")
	}
}

// groupOf draws a bolt group, its coordinates counted from its centroid: scattered, in a line, or on a grid.
func groupOf(t *rapid.T) (u, v []float64) {
	n := rapid.IntRange(2, 12).Draw(t, "bolts")
	kind := rapid.SampledFrom([]string{"scattered", "row", "column", "grid"}).Draw(t, "kind")
	for i := range n {
		x, y := float64(i)*0.075, float64(i)*0.075
		switch kind {
		case "scattered":
			x, y = rapid.Float64Range(-0.3, 0.3).Draw(t, "x"), rapid.Float64Range(-0.3, 0.3).Draw(t, "y")
		case "row":
			y = 0
		case "column":
			x = 0
		case "grid":
			x = float64(i%2) * 0.14
		}
		u, v = append(u, x), append(v, y)
	}
	mx, my := 0.0, 0.0
	for i := range u {
		mx, my = mx+u[i]/float64(n), my+v[i]/float64(n)
	}
	for i := range u {
		u[i], v[i] = u[i]-mx, v[i]-my
	}
	return u, v
}

// The forces on the bolts, worked out from the centre of rotation that was found, balance the load.
func TestBoltGroupAtUltimateBalances(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		u, v := groupOf(t)
		size := 0.0
		for i := range u {
			size = max(size, math.Hypot(u[i], v[i]))
		}
		if size < 1e-3 {
			return
		}
		e := rapid.Float64Range(-3, 3).Draw(t, "e")
		theta := rapid.Float64Range(-math.Pi/2, math.Pi/2).Draw(t, "theta")
		m, err := solveIC(u, v, e, theta)
		if err != nil {
			t.Fatal(err)
		}
		if e == 0 || math.Abs(e*math.Cos(theta)) < 1e-9*size {
			return // alike for all bolts: see TestConcentricBoltGroup
		}
		x, y := m.x(), m.y()
		farthest := 0.0
		for i := range u {
			farthest = max(farthest, math.Hypot(u[i]-x, v[i]-y))
		}
		turn := math.Copysign(1, e*math.Cos(theta))
		var fx, fy, moment float64
		for i := range u {
			r := math.Hypot(u[i]-x, v[i]-y)
			if r == 0 {
				continue
			}
			f := math.Pow(1-math.Exp(-10*0.34*r/farthest), 0.55)
			dx, dy := -(v[i]-y)/r*turn, (u[i]-x)/r*turn
			fx, fy, moment = fx+f*dx, fy+f*dy, moment+f*(u[i]*dy-v[i]*dx)
		}
		c := fy*math.Cos(theta) - fx*math.Sin(theta)
		across := fx*math.Cos(theta) + fy*math.Sin(theta)
		if !(c > 0) || math.Abs(across) > 1e-6*float64(len(u)) || math.Abs(moment-c*e*math.Cos(theta)) > 1e-6*size*float64(len(u)) {
			t.Fatalf("C = %g, across %g, moment %g for %g", c, across, moment, c*e*math.Cos(theta))
		}
	})
}

func TestConcentricBoltGroup(t *testing.T) {
	u, v := []float64{-1, 1, 0}, []float64{0, 0, 0}
	for _, c := range []struct{ e, theta float64 }{{0, 0}, {0, 0.5}, {2, math.Pi / 2}, {1e6, math.Pi / 2}, {-1e6, 3 * math.Pi / 2}} {
		m, err := solveIC(u, v, c.e, c.theta)
		if err != nil || m.turn != 0 || !math.IsNaN(m.x()) || !math.IsNaN(m.y()) {
			t.Errorf("e = %g, theta = %g: %+v (%v)", c.e, c.theta, m, err)
		}
	}
	if _, err := solveIC([]float64{0, 0}, []float64{0, 0}, 1, 0); err == nil {
		t.Error("bolts in one place resist a moment")
	}
	if _, err := solveIC([]float64{0, 0}, []float64{0}, 1, 0); err == nil {
		t.Error("a bolt has one coordinate")
	}
}

// A load far off is a moment: C·e comes to what the group resists about its centroid, each bolt by its distance, where
// that is its centre by symmetry. A bolt at the centroid itself takes what is left of the force.
func TestFarLoadIsAMoment(t *testing.T) {
	for _, g := range []struct{ u, v []float64 }{
		{[]float64{0, 0, 0}, []float64{-0.075, 0, 0.075}},
		{[]float64{-0.07, -0.07, 0.07, 0.07}, []float64{-0.04, 0.04, -0.04, 0.04}},
	} {
		resists := 0.0
		farthest := math.Hypot(g.u[0], g.v[0])
		for i := range g.u {
			r := math.Hypot(g.u[i], g.v[i])
			resists += r * math.Pow(1-math.Exp(-3.4*r/farthest), 0.55)
		}
		for _, e := range []float64{100, -1000, 10000} {
			m, err := solveIC(g.u, g.v, e, 0)
			if err != nil || m.x() == 0 {
				t.Errorf("e = %g: %+v, %v", e, m, err)
				continue
			}
			force := 0.0
			for i := range g.u {
				dx, dy := m.shiftX-m.turn*g.v[i], m.shiftY+m.turn*g.u[i]
				d := math.Hypot(dx, dy)
				force += math.Pow(-math.Expm1(-3.4*d), 0.55) * dy / d
			}
			if got := force * math.Abs(e); math.Abs(got-resists) > 1e-3*resists {
				t.Errorf("e = %g: C·e is %g, want %g", e, got, resists)
			}
		}
		if _, err := solveIC(g.u, g.v, 1e9, 0); err == nil {
			t.Error("a load on the moon has a figure")
		}
	}
}

// A load whose centre lies at a bolt itself is found too, though the bolt's force there turns within a last bit.
func TestCentreAtABolt(t *testing.T) {
	f := func(d float64) float64 { return math.Pow(1-math.Exp(-3.4*d), 0.55) }
	at := (f(0.5)*75+f(1)*150)/(f(0.5)+f(1)) - 75 // mm, about the first of three bolts
	for _, off := range []float64{0, 1e-12, -1e-10, 1e-8, -1e-6} {
		m, err := solveIC([]float64{-75, 0, 75}, []float64{0, 0, 0}, at*(1+off), 0)
		if err != nil || math.Abs(m.x()+75) > 1e-4 || m.y() != 0 {
			t.Errorf("%g off: %+v, %v", off, m, err)
		}
	}
}

// A native has one name, which no helper bears.
func TestNativesHaveNamesOfTheirOwn(t *testing.T) {
	seen := map[string]bool{}
	for _, n := range natives {
		if seen[n.Name] || n.F == nil || len(n.Params) == 0 {
			t.Errorf("%s stands twice or is empty", n.Name)
		}
		seen[n.Name] = true
		if slices.Contains(Load().Names, n.Name) {
			t.Errorf("%s is a helper too", n.Name)
		}
	}
}

// A group that is symmetrical about the line of the load moves along and turns, and
// nothing else: no dust of the search is left on the page.
func TestSymmetricalBoltGroupLeavesNoDust(t *testing.T) {
	u, v := []float64{0, 0, 0, 0}, []float64{-4.5, -1.5, 1.5, 4.5}
	m, err := solveIC(u, v, 1.5, 0)
	if err != nil || m.shiftX != 0 || m.y() != 0 || m.x() >= 0 {
		t.Errorf("got %+v, %v: want no movement across the load and a centre on the other side", m, err)
	}
}
