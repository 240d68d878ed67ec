package library_test

import (
	"math"
	"strings"
	"testing"

	"gusset/notebook/diag"
)

const square = "```schedule b\nmark | x [mm] | y [mm]\nA | 0 | 0\nB | 100 | 0\nC | 0 | 100\nD | 100 | 100\n```\n"

// A load through the centroid has no centre: the result does not exist, and using it is an error.
func TestNoInstantaneousCentre(t *testing.T) {
	sheet := compile(square + "r = bolt_group_ic(b.x, b.y, 0 mm)\n")
	if sheet.Failed() {
		t.Fatal(messages(sheet))
	}
	for _, id := range []string{"r.x_ic", "r.y_ic"} {
		if x := number(t, sheet, id); !math.IsNaN(x) {
			t.Errorf("%s is %g", id, x)
		}
	}
	sheet = compile(square + "r = bolt_group_ic(b.x, b.y, 0 mm)\nz = r.x_ic + 1 mm\n")
	if all := messages(sheet); !strings.Contains(all, diag.OutOfRange) || step(sheet, "r.C") == nil {
		t.Errorf("using a centre that does not exist:\n%s", all)
	}
}

// A call with load cases runs once for each, and its columns keep their rows.
func TestGroupOverLoadCases(t *testing.T) {
	sheet := compile(square + "```cases\nname | e [mm] | P [kN]\nLC1 | 0 | 10\nLC2 | 200 | 20\nLC3 | -200 | 30\n```\n" +
		"u = bolt_group_ic(b.x, b.y, e)\nf = bolt_group_elastic(b.x, b.y, 0 kN, P, P*e)\nworst = max(f.F_max)\nF_B = max(f.F over cases)\n")
	if sheet.Failed() {
		t.Fatal(messages(sheet))
	}
	c := step(sheet, "u.C").Value
	if len(c.Num) != 3 || !near(c.Num[0], 4*math.Pow(1-math.Exp(-3.4), 0.55), 0) || !near(c.Num[1], c.Num[2], 1e-9) || c.Num[1] >= c.Num[0] {
		t.Errorf("C = %v", c.Num)
	}
	x := step(sheet, "u.x_ic").Value.Num
	if !math.IsNaN(x[0]) || !(x[1] < 0) || !near(x[2], -x[1], 1e-9) {
		t.Errorf("x_ic = %v", x)
	}
	if f := step(sheet, "f.F").Value; len(f.Num) != 12 || len(f.Type.Rows) != 2 {
		t.Errorf("F has %d entries over %d sets of rows", len(f.Num), len(f.Type.Rows))
	}
}

// A speed in radians is not one in turns.
func TestSpeedInTurns(t *testing.T) {
	for call, ok := range map[string]bool{
		"shaft_torque(7.5 kW, 1450 rpm)": true, "shaft_torque(7.5 kW, 24 Hz)": true, "shaft_torque(7.5 kW, 151 rad/s)": false, "shaft_torque(7.5 kW, n_s)": false,
	} {
		sheet := compile("n_s = 151 rad/s\nr = " + call + "\n")
		if sheet.Failed() == ok || !ok && !strings.Contains(messages(sheet), diag.DimensionMismatch) {
			t.Errorf("%s: %s", call, messages(sheet))
		}
	}
}

// What the library computes in Go is for the library's own lines, and a calc may use the names.
func TestNativesAreTheLibrarysOwn(t *testing.T) {
	if sheet := compile("r = saint_venant_k1(2)\n"); !strings.Contains(messages(sheet), diag.UnknownName) {
		t.Errorf("a calc calls what is the library's:\n%s", messages(sheet))
	}
	sheet := compile("ic_x(a) = 2*a\nprincipal_stress = 3 MPa\nr = ic_x(principal_stress)\ns = torsion_rectangle(1 kN*m, 40 mm, 20 mm, 1 m, 80 GPa)\n")
	if sheet.Failed() {
		t.Errorf("a calc may not use the names:\n%s", messages(sheet))
	}
}

// What a helper defines inside cannot be reached and does not meet the caller's names.
func TestOnlyResultsCanBeReached(t *testing.T) {
	sheet := compile("beta = 7 kN\nJ_c = 3 mm\nr = dowel_timber_single_ec5(38 mm, 50 mm, 4 mm, 20 MPa, 20 MPa, 6000 N*mm)\nx = r.J_c\ny = r.F_c + beta\nz = 2*J_c\n")
	all := messages(sheet)
	if !strings.Contains(all, diag.UnknownName) || strings.Count(all, "\n") != 1 {
		t.Errorf("one unknown name, not\n%s", all)
	}
}
