package examples_test

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"

	"gusset/notebook"
	"gusset/notebook/eval"
)

// The examples whose governing entries matter, computed again by plain Go
// from the figures on their drawings, every entry of them. The formulas are
// those of the standards that the calcs name; nothing of the program is used.

// find returns a value of the calc, a helper's results included.
func find(t *testing.T, s *notebook.Sheet, id string) *eval.Step {
	t.Helper()
	for _, st := range s.Steps {
		if st.ID == id {
			return st
		}
		for _, r := range st.Results {
			if r.ID == id {
				return r
			}
		}
	}
	t.Fatalf("there is no %s", id)
	return nil
}

// check returns a check by its note.
func check(t *testing.T, s *notebook.Sheet, note string) *eval.CheckResult {
	t.Helper()
	for _, st := range s.Steps {
		if st.Check != nil && st.Note == note {
			return st.Check
		}
	}
	t.Fatalf("there is no check of %q", note)
	return nil
}

// same compares all entries of a value, in coherent SI units.
func same(t *testing.T, what string, got, want []float64) {
	t.Helper()
	if len(got) != len(want) {
		t.Fatalf("%s has %d entries, want %d", what, len(got), len(want))
	}
	for i := range want {
		if math.Abs(got[i]-want[i]) > 1e-9*math.Max(math.Abs(want[i]), 1e-9) && !(math.IsNaN(got[i]) && math.IsNaN(want[i])) {
			t.Errorf("%s[%d] is %.12g, want %.12g", what, i, got[i], want[i])
		}
	}
}

// largest is the first largest entry.
func largest(x []float64) int {
	at := 0
	for i, v := range x {
		if v > x[at]*(1+1e-9) {
			at = i
		}
	}
	return at
}

// governs compares a check's utilisations and the entry that governs.
func governs(t *testing.T, c *eval.CheckResult, mark string, ratios []float64) {
	t.Helper()
	same(t, "utilisation", c.Ratio, ratios)
	at := largest(ratios)
	if math.Abs(c.Ratio[c.Governs]-ratios[at]) > 1e-9*ratios[at] || c.Type.Mark(c.Governs) != mark {
		t.Errorf("%s governs with %g, want %s with %g", c.Type.Mark(c.Governs), c.Ratio[c.Governs], mark, ratios[at])
	}
}

func TestEccentricBracketByHand(t *testing.T) {
	s := open(t, "eccentric-bracket.md")
	cases := [][2]float64{{118, 0}, {104, 16}, {104, -16}, {62, 9}, {126, 0}, {88, 24}} // V, H in kN
	var xy [][2]float64                                                                 // mm
	for _, y := range []float64{112.5, 37.5, -37.5, -112.5} {
		xy = append(xy, [2]float64{-70, y}, [2]float64{70, y})
	}
	const ex, ey = 260, 85
	ip := 0.0
	for _, p := range xy {
		ip += p[0]*p[0] + p[1]*p[1]
	}
	// F_v_Rd: 0.6·800·245/1.25; bearing: the end distance decides, 40/(3·22)
	// and 50/(3·22) with k_1 = 2.5 in both plates.
	fv := 0.6 * 800 * 245 / 1.25 / 1000
	fb := 2.5 * 40 / 66 * 470 * 20 * 15 / 1.25 / 1000
	fc := 2.5 * 50 / 66 * 410 * 20 * 17 / 1.25 / 1000
	var fx, fy, f, most, shear, plate, flange, moment, stress, net []float64
	for _, c := range cases {
		v, h := c[0], c[1]
		m := -v*ex - h*ey // kN·mm
		moment = append(moment, m)
		worst := 0.0
		for _, p := range xy {
			x, y := h/8-m*p[1]/ip, -v/8+m*p[0]/ip
			fx, fy, f = append(fx, x*1e3), append(fy, y*1e3), append(f, math.Hypot(x, y)*1e3)
			r := math.Sqrt(x*x + y*y)
			worst = math.Max(worst, r)
			shear, plate, flange = append(shear, r/fv), append(plate, r/fb), append(flange, r/fc)
		}
		most = append(most, worst*1e3)
		// Net section through four holes of 22 in a plate 305 × 15.
		inet := 15*math.Pow(305, 3)/12 - 15*22*2*(112.5*112.5+37.5*37.5)
		anet := (305.0 - 4*22) * 15
		sigma := (v*(ex-70)+math.Abs(h)*ey)*1e3*305/2/inet + math.Abs(h)*1e3/anet
		tau := 1.5 * v * 1e3 / anet
		sv := math.Sqrt(sigma*sigma + 3*tau*tau)
		stress, net = append(stress, sv*1e6), append(net, sv/355)
	}
	same(t, "M", find(t, s, "M").Value.Num, moment) // kN·mm are N·m
	same(t, "F_x", find(t, s, "grp.F_x").Value.Num, fx)
	same(t, "F_y", find(t, s, "grp.F_y").Value.Num, fy)
	same(t, "F", find(t, s, "grp.F").Value.Num, f)
	same(t, "F_max", find(t, s, "grp.F_max").Value.Num, most)
	same(t, "F_env", find(t, s, "F_env").Value.Num, []float64{most[largest(most)]})
	same(t, "F_Rd", find(t, s, "F_Rd").Value.Num, []float64{fv * 1e3})
	same(t, "sigma_v", find(t, s, "sigma_v").Value.Num, stress)
	governs(t, check(t, s, "Shear of the bolts"), "LC5 test load, B2", shear)
	governs(t, check(t, s, "Bearing on the plate"), "LC5 test load, B2", plate)
	governs(t, check(t, s, "Bearing on the flange"), "LC5 test load, B2", flange)
	governs(t, check(t, s, "Net section of the plate, elastic"), "LC5 test load", net)
	for i, st := range stepsOf(s, "F_x", "F_y", "F") {
		if got := len(st.Value.Num); got != 8 {
			t.Errorf("%d: the helper's own lines have %d entries, want one for each bolt", i, got)
		}
	}
}

// stepsOf are the lines of the helpers that the calc calls, by name.
func stepsOf(s *notebook.Sheet, names ...string) []*eval.Step {
	var list []*eval.Step
	for _, st := range s.Steps {
		for _, call := range st.Calls {
			for _, in := range call.Steps {
				for _, name := range names {
					if in.ID == name && call.Expr.Fun.ID == "bolt_group_elastic" {
						list = append(list, in)
					}
				}
			}
		}
	}
	return list
}

// rowsOf reads a CSV file with comments: its rows below the header.
func rowsOf(t *testing.T, path string) [][]string {
	t.Helper()
	text, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	r := csv.NewReader(strings.NewReader(string(text)))
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	return rows[1:]
}

func float(t *testing.T, text string) float64 {
	t.Helper()
	x, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

func TestMemberScheduleByHand(t *testing.T) {
	s := open(t, "member-schedule.md")
	stock := rowsOf(t, "square-tubes.csv")
	const fy, e, alpha = 355.0, 210e3, 0.21
	buckling := func(a, l, i float64) float64 { // mm², mm, mm to N, EN 1993-1-1, 6.3.1.2
		ncr := math.Pi * math.Pi * e * a * i * i / (l * l)
		lambda := math.Sqrt(a * fy / ncr)
		phi := 0.5 * (1 + alpha*(lambda-0.2) + lambda*lambda)
		return math.Min(1, 1/(phi+math.Sqrt(phi*phi-lambda*lambda))) * a * fy
	}
	var names, marks []string
	var areas, nb, nt, compression, tension, slender []float64
	mass := 0.0
	for _, row := range rowsOf(t, "truss-members.csv") {
		c, n, l := float(t, row[2])*1e3, float(t, row[3])*1e3, float(t, row[4])*1e3
		found := false
		for _, tube := range stock {
			a, i := float(t, tube[3])*100, float(t, tube[4])*10
			if c > buckling(a, l, i) || n > a*fy || l/i > 180 {
				continue
			}
			names, marks, areas = append(names, tube[0]), append(marks, row[0]), append(areas, a/1e6)
			nb, nt = append(nb, buckling(a, l, i)), append(nt, a*fy)
			ratio := c / buckling(a, l, i)
			if c == 0 {
				ratio = math.NaN()
			}
			compression, tension, slender = append(compression, ratio), append(tension, n/(a*fy)), append(slender, l/i/180)
			mass += 2 * float(t, tube[5]) * l / 1e3
			found = true
			break
		}
		if !found {
			t.Fatalf("no tube will do for %s", row[0])
		}
	}
	same(t, "A", find(t, s, "A").Value.Num, areas)
	if got := find(t, s, "section").Value.Text; strings.Join(got, "; ") != strings.Join(names, "; ") {
		t.Errorf("sections are %v, want %v", got, names)
	}
	same(t, "N_b", find(t, s, "N_b").Value.Num, nb)
	same(t, "N_t", find(t, s, "N_t").Value.Num, nt)
	same(t, "W_m", find(t, s, "W_m").Value.Num, []float64{mass})
	number := func(x []float64) []float64 { // L1 has no compression and so no ratio
		y := append([]float64(nil), x...)
		for i := range y {
			if math.IsNaN(y[i]) {
				y[i] = 0
			}
		}
		return y
	}
	same(t, "compression", check(t, s, "Compression").Ratio, compression)
	c := check(t, s, "Compression")
	if want := marks[largest(number(compression))]; c.Type.Mark(c.Governs) != want || want != "U3" {
		t.Errorf("%s governs compression, want %s", c.Type.Mark(c.Governs), want)
	}
	governs(t, check(t, s, "Tension"), marks[largest(tension)], tension)
	governs(t, check(t, s, "Slenderness"), marks[largest(slender)], slender)
}

func TestWebPlaneStressByEigenvalues(t *testing.T) {
	s := open(t, "web-plane-stress.md")
	// Plate girder 600 × 250, flanges 20, web 10; loads times 1.35.
	i := (250*math.Pow(600, 3) - 240*math.Pow(560, 3)) / 12
	sx := -498e6 * 280 / i
	sz := -142e3 / (3.25 * math.Cbrt(2.9e6/10) * 10)
	tau := -305e3*250*20*290/(i*10) + 0.2*sz
	x, z, xz := 1.35*sx, 1.35*sz, 1.35*tau
	var eigen mat.EigenSym
	if !eigen.Factorize(mat.NewSymDense(2, []float64{x, xz, xz, z}), true) {
		t.Fatal("no eigenvalues")
	}
	values := eigen.Values(nil) // ascending
	var vectors mat.Dense
	eigen.VectorsTo(&vectors)
	mpa := func(v float64) []float64 { return []float64{v * 1e6} }
	same(t, "sigma_1", find(t, s, "sigma_1").Value.Num, mpa(values[1]))
	same(t, "sigma_2", find(t, s, "sigma_2").Value.Num, mpa(values[0]))
	// The direction of the smaller principal stress, as an axis.
	theta := find(t, s, "theta_2").Value.Num[0]
	if turn := math.Cos(theta)*vectors.At(1, 0) - math.Sin(theta)*vectors.At(0, 0); math.Abs(turn) > 1e-9 {
		t.Errorf("theta_2 is %g°, off the eigenvector by %g", theta*180/math.Pi, turn)
	}
	// Von Mises from the principal stresses; both are compressive, so Tresca
	// counts from zero to the smaller.
	a, b := values[0], values[1]
	same(t, "sigma_v", find(t, s, "sigma_v").Value.Num, mpa(math.Sqrt((a*a+b*b+(a-b)*(a-b))/2)))
	if b > 0 {
		t.Errorf("sigma_1 is tensile: %g MPa", b)
	}
	same(t, "tau_a", find(t, s, "tau_a").Value.Num, mpa(-a/2))
	governs(t, check(t, s, "Top of the web, elastic"), "", []float64{math.Sqrt(a*a-a*b+b*b) / 355})
	governs(t, check(t, s, "The same after Tresca, for comparison"), "", []float64{-a / 355})

	// The stress on turned axes by the matrix product R·S·Rᵀ.
	turned := func(angle, x, z, xz float64) (n, shear float64) {
		r := mat.NewDense(2, 2, []float64{math.Cos(angle), math.Sin(angle), -math.Sin(angle), math.Cos(angle)})
		var m, out mat.Dense
		m.Mul(r, mat.NewDense(2, 2, []float64{x, xz, xz, z}))
		out.Mul(&m, r.T())
		return out.At(0, 0), out.At(0, 1)
	}
	n, shear := turned(-30*math.Pi/180, x, z, xz)
	same(t, "sigma_n", find(t, s, "sigma_n").Value.Num, mpa(n))
	same(t, "tau_n", find(t, s, "tau_n").Value.Num, mpa(shear))

	// The strains of the gauges under 1.1 times the characteristic load: the
	// strain tensor by Hooke's law, turned as a tensor.
	const e, nu, k = 210e3, 0.3, 1.1
	ex, ez, exz := k*(sx-nu*sz)/e, k*(sz-nu*sx)/e, k*(1+nu)/e*tau
	var strains []float64
	for _, angle := range []float64{0, 45, 90} {
		g, _ := turned(angle*math.Pi/180, ex, ez, exz)
		strains = append(strains, g)
	}
	same(t, "epsilon", find(t, s, "epsilon").Value.Num, strains)
	same(t, "gamma_xz", find(t, s, "gamma_xz").Value.Num, []float64{2 * exz})
}
