package library_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"gusset/notebook/library"
)

// Figures of the shipped tables, read as a calc reads them: by schedule and mark.
var tableRows = []struct {
	table, want string // `t.A_s at "M20" = 245 mm^2`
	source      string
}{
	{"bolts_metric", `t.A_s at "M6" = 20.1 mm^2; t.A_s at "M12" = 84.3 mm^2; t.A_s at "M16" = 157 mm^2; t.A_s at "M20" = 245 mm^2; t.A_s at "M24" = 353 mm^2; t.A_s at "M30" = 561 mm^2; t.A_s at "M36" = 817 mm^2`, "ISO 898-1, from memory"},
	{"bolts_metric", `t.p at "M8" = 1.25 mm; t.p at "M10" = 1.5 mm; t.p at "M12" = 1.75 mm; t.p at "M14" = 2 mm; t.p at "M22" = 2.5 mm; t.p at "M27" = 3 mm; t.p at "M33" = 3.5 mm; t.p at "M36" = 4 mm; t.d at "M27" = 27 mm`, "ISO 261, from memory"},
	{"bolts_metric", `t.d_3 at "M12" = 9.853 mm; t.d_2 at "M12" = 10.863 mm; t.A at "M20" = 314.2 mm^2`, "ISO 724, ISO 898-1, from memory"},
	{"bolts_unc", `t.A_t at "1/2" = 0.1419 in^2; t.A_t at "3/4" = 0.334 in^2; t.A_t at "7/8" = 0.462 in^2; t.A_t at "1" = 0.606 in^2; t.A_t at "1 1/2" = 1.405 in^2; t.d at "1 1/8" = 1 1/8 in; t.p at "3/4" = 1/10 in; t.A_b at "3/4" = 0.4418 in^2`, "ASME B1.1, from memory"},
	{"nails_common", `t.D at "6d" = 0.113 in; t.L at "6d" = 2 in; t.D at "8d" = 0.131 in; t.L at "8d" = 2 1/2 in; t.D at "10d" = 0.148 in; t.D at "16d" = 0.162 in; t.L at "16d" = 3 1/2 in; t.D at "20d" = 0.192 in; t.D at "60d" = 0.263 in; t.L at "60d" = 6 in; t.H at "16d" = 0.344 in`, "ASTM F1667; NDS Table L4, from memory"},
	{"nails_common", `t.F_yb at "8d" = 100 ksi; t.F_yb at "10d" = 90 ksi; t.F_yb at "16d" = 90 ksi; t.F_yb at "20d" = 80 ksi; t.F_yb at "50d" = 70 ksi`, "NDS Table I1, from memory"},
	{"bolt_grades_metric", `t.f_ub at "4.6" = 400 MPa; t.f_yb at "4.6" = 240 MPa; t.f_yb at "5.8" = 400 MPa; t.f_ub at "6.8" = 600 MPa; t.f_yb at "8.8" = 640 MPa; t.f_ub at "10.9" = 1000 MPa; t.f_yb at "10.9" = 900 MPa; t.f_ub at "12.9" = 1200 MPa`, "ISO 898-1, from memory: the first figure is f_ub/100, the second ten times f_yb/f_ub"},
	{"bolt_grades_astm", `t.F_nv_N at "A325" = 54 ksi; t.F_nv_X at "A325" = 68 ksi; t.F_nt at "A325" = 90 ksi; t.F_nv_N at "A490" = 68 ksi; t.F_nv_X at "A490" = 84 ksi; t.F_nt at "A490" = 113 ksi; t.F_nv_N at "A307" = 27 ksi; t.F_u at "A325" = 120 ksi; t.F_u at "F2280" = 150 ksi; t.F_nt at "F1852" = 90 ksi`, "ANSI/AISC 360-16, Table J3.2, from memory"},
	{"steels_en10025", `t.f_y_16 at "S235" = 235 MPa; t.f_y_40 at "S275" = 265 MPa; t.f_y_63 at "S355" = 335 MPa; t.f_y_80 at "S355" = 325 MPa; t.f_y_100 at "S235" = 215 MPa; t.f_y_150 at "S355" = 295 MPa; t.f_u_100 at "S275" = 410 MPa; t.f_u_100 at "S355" = 470 MPa; t.f_u_150 at "S235" = 350 MPa`, "EN 10025-2, from memory"},
	{"steels_astm", `t.F_y at "A36" = 36 ksi; t.F_u at "A36" = 58 ksi; t.F_y at "A572-50" = 50 ksi; t.F_u at "A572-50" = 65 ksi; t.F_u at "A572-65" = 80 ksi; t.F_y at "A992" = 50 ksi; t.F_u at "A992" = 65 ksi`, "AISC Manual, Table 2-4, from memory"},
	{"timber_en338", `t.rho_k at "C16" = 310 kg/m^3; t.f_m_k at "C24" = 24 MPa; t.rho_k at "C24" = 350 kg/m^3; t.rho_mean at "C24" = 420 kg/m^3; t.E_0_mean at "C24" = 11 GPa; t.G_mean at "C24" = 0.69 GPa; t.rho_k at "C30" = 380 kg/m^3; t.rho_k at "D30" = 530 kg/m^3; t.rho_k at "D40" = 550 kg/m^3; t.rho_mean at "D50" = 740 kg/m^3`, "EN 338:2016, from memory"},
}

func TestTables(t *testing.T) {
	used := map[string]bool{}
	for _, r := range tableRows {
		path := "library/" + r.table + ".csv"
		used[path] = true
		text := fmt.Sprintf("```schedule t from %s\n```\n", path)
		pairs := row{call: r.table, want: r.want}.wants(t)
		for i, w := range pairs {
			text += fmt.Sprintf("g_%d = %s\nw_%d = %s\n", i, w[0], i, w[1])
		}
		sheet := compile(text)
		if sheet.Failed() {
			t.Errorf("%s\n%s", r.table, messages(sheet))
			continue
		}
		for i, w := range pairs {
			if g, x := number(t, sheet, fmt.Sprintf("g_%d", i)), number(t, sheet, fmt.Sprintf("w_%d", i)); !near(g, x, 1e-12) {
				t.Errorf("%s: %s is %g, want %s (%s)", r.table, w[0], g, w[1], r.source)
			}
		}
	}
	for path := range library.Load().Tables {
		if !used[path] {
			t.Errorf("%s is not tested", path)
		}
	}
}

// columns reads a shipped table whole: marks, and columns in coherent SI.
func columns(t *testing.T, table string, names ...string) (marks []string, cols [][]float64) {
	t.Helper()
	sheet := compile("```schedule t from library/" + table + ".csv\n```\n")
	if sheet.Failed() {
		t.Fatal(messages(sheet))
	}
	for _, b := range sheet.Blocks {
		if b.Rows != nil {
			marks = b.Rows.Marks
		}
	}
	for _, n := range names {
		var found []float64
		for _, b := range sheet.Blocks {
			for _, st := range b.Steps {
				if st.ID == "t."+n {
					found = st.Value.Num
				}
			}
		}
		if len(found) == 0 || len(found) != len(marks) {
			t.Fatalf("%s has no column %s", table, n)
		}
		cols = append(cols, found)
	}
	return marks, cols
}

// The whole columns against the formulas that the standards define them by.
func TestThreadTables(t *testing.T) {
	marks, c := columns(t, "bolts_metric", "d", "p", "d_2", "d_3", "A", "A_s")
	for i, m := range marks {
		d, p := c[0][i], c[1][i]
		d2, d3 := d-0.649519*p, d-1.226869*p
		for _, x := range []struct {
			name            string
			got, want, near float64
		}{
			{"d_2", c[2][i], d2, 1e-4}, {"d_3", c[3][i], d3, 1e-4}, {"A", c[4][i], math.Pi * d * d / 4, 1e-3},
			{"A_s", c[5][i], math.Pi / 4 * math.Pow((d2+d3)/2, 2), 5e-3}, // ISO 898-1 9.1.6.1, rounded to three figures
		} {
			if !near(x.got, x.want, x.near) {
				t.Errorf("%s: %s is %g, want %g", m, x.name, x.got, x.want)
			}
		}
		if m != fmt.Sprintf("M%.0f", d*1000) {
			t.Errorf("%s has the diameter %g", m, d)
		}
	}
	marks, c = columns(t, "bolts_unc", "d", "p", "A_b", "A_t")
	for i, m := range marks {
		d, p := c[0][i], c[1][i]
		if !near(c[2][i], math.Pi*d*d/4, 1e-3) || !near(c[3][i], math.Pi/4*math.Pow(d-0.9743*p, 2), 5e-3) { // ASME B1.1: d - 0.9743/n
			t.Errorf("%s: areas %g and %g", m, c[2][i], c[3][i])
		}
	}
}

// Names of property classes and grades say their strengths.
func TestGradeTables(t *testing.T) {
	marks, c := columns(t, "bolt_grades_metric", "f_yb", "f_ub")
	for i, m := range marks {
		var a, b float64
		fmt.Sscanf(strings.Replace(m, ".", " ", 1), "%g %g", &a, &b)
		if c[1][i] != a*100e6 || math.Abs(c[0][i]-a*b*10e6) > 1e3 {
			t.Errorf("%s: %g, %g", m, c[0][i], c[1][i])
		}
	}
	marks, c = columns(t, "steels_en10025", "f_y_16", "f_y_40", "f_y_63", "f_y_80", "f_y_100", "f_y_150", "f_u_100", "f_u_150")
	for i, m := range marks {
		if m != fmt.Sprintf("S%.0f", c[0][i]/1e6) {
			t.Errorf("%s yields at %g", m, c[0][i])
		}
		for k := 1; k < 6; k++ {
			if c[k][i] > c[k-1][i] {
				t.Errorf("%s: thicker plates yield no later", m)
			}
		}
		if c[7][i] >= c[6][i] {
			t.Errorf("%s: thicker plates are weaker", m)
		}
	}
	marks, c = columns(t, "timber_en338", "f_m_k", "rho_k", "rho_mean", "E_0_mean", "G_mean")
	for i, m := range marks {
		if m[1:] != fmt.Sprintf("%.0f", c[0][i]/1e6) {
			t.Errorf("%s: f_m_k is %g", m, c[0][i])
		}
		// EN 384: rho_mean = 1.2·rho_k to the nearest 10 kg/m³, G_mean = E_0_mean/16, rounded
		if math.Abs(c[2][i]-1.2*c[1][i]) > 5 || !near(c[4][i], c[3][i]/16, 0.02) {
			t.Errorf("%s: rho %g and %g, E %g and G %g", m, c[1][i], c[2][i], c[3][i], c[4][i])
		}
	}
	if len(marks) < 19 {
		t.Errorf("%d classes of timber", len(marks))
	}
}

// Each table says where its figures come from, and which of them are from memory.
func TestTablesSayWhatIsFromMemory(t *testing.T) {
	for name, src := range library.Load().Tables {
		head, _, _ := strings.Cut(string(src.Text), "\nmark")
		if !strings.Contains(head, "from memory") {
			t.Errorf("%s does not say which of its figures are from memory", name)
		}
	}
}
