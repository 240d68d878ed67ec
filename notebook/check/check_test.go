package check_test

import (
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// front is the front matter of a test's calc file.
const front = "---\ncalc: T-1\nunits: [kN, mm, MPa, kN*m]\n---\n"

// given are the values that the tables below use.
const given = `
P = 48 kN # Pull [schedule]
d = 25 mm # Diameter [drawing]
t = 5 mm # Thickness [drawing]
f_y = 355 MPa # Yield strength [standard]
E = 210 GPa # Modulus [standard]
grade = "S355" # Grade [drawing]
T_0 = 20 degC # Temperature [brief]
omega = 10 rad/s # Speed [brief]
n_r = 300 rpm # Speed [brief]
`

const tables = "```schedule bolts # Positions [drawing]\nmark | x [mm] | F [kN]\nB1 | -70 | 10\nB2 | 70 | 20\n```\n" +
	"```cases # Load cases [brief]\ncase | V [kN]\nLC1 | 30\nLC2 | 50\n```\n"

// compile compiles lines of one calc block behind the givens and the tables.
func compile(lines string) *notebook.Sheet {
	text := front + "# Section\n" + tables + "```calc\n" + strings.TrimSpace(given) + "\n" + lines + "\n```\n"
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: []byte(text)}}
	return notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
}

// faults are the errors and warnings of a sheet.
func faults(s *notebook.Sheet) []diag.Diagnostic {
	var out []diag.Diagnostic
	for _, d := range s.Diagnostics {
		if d.Severity != diag.Note {
			out = append(out, d)
		}
	}
	return out
}

// Each mistake is reported once, with its id, with words that say what was
// found, and with a way out; the corrected line compiles.
func TestMistakes(t *testing.T) {
	for _, c := range []struct {
		line    string
		id      string
		message string // part of the message
		hint    string // part of what follows it
		fixed   string
	}{
		{"tau [MPa] = P/d", diag.DimensionMismatch, "tau is declared in MPa (stress), but P/d is a force per length (kN/m)", "a length is missing in the denominator; lengths in scope: d, t, bolts.x", "tau [MPa] = P/(d*t)"},
		{"tau [MPa] = P", diag.DimensionMismatch, "but P is a force (kN)", "an area is missing in the denominator", "tau [MPa] = P/d^2"},
		{"M [kN*m] = P", diag.DimensionMismatch, "declared in kN*m (moment)", "a length is missing as a factor; lengths in scope: d, t, bolts.x", "M [kN*m] = P*d"},
		{"s = P + d", diag.DimensionMismatch, "a force (kN) and a length (mm) cannot be added: `P` and `d`", "", "s = P + 1 kN"},
		{"s = P - d", diag.DimensionMismatch, "a length (mm) cannot be taken from a force (kN)", "", "s = P - 1 kN"},
		{"s = P + 1", diag.DimensionMismatch, "a force (kN) and a plain number cannot be added", "", "s = P + 1 kN"},
		{"s = sin(d)", diag.DimensionMismatch, "sin takes a plain number or an angle, but `d` is a length (mm)", "divide it", "s = sin(d/t*1 rad)"},
		{"s = max(P, d)", diag.DimensionMismatch, "max takes values of one dimension", "", "s = max(P, 3 kN)"},
		{"s = d^t", diag.DimensionMismatch, "an exponent is a plain number, but `t` is a length (mm)", "", "s = d^2"},
		{"s = d^(P/(2 kN))", diag.DimensionMismatch, "must be a constant", "a constant is a literal", "s = d^2"},
		{"check P <= f_y", diag.DimensionMismatch, "`P` is a force (kN), but `f_y` is a stress (MPa)", "an area is missing", "check P <= f_y*d^2"},
		{"check P", diag.Syntax, "a check compares two values", "check tau <= tau_d", "check P <= 50 kN"},
		{"check P > 1 kN and P < 50 kN", diag.Syntax, "two checks", "`check P > 1 kN`", "check P > 1 kN"},
		{"s = P if P > d\n  = 2*P otherwise", diag.DimensionMismatch, "", "", "s = P if P > 1 kN\n  = 2*P otherwise"},
		{"s = P if t > 1 mm\n  = d otherwise", diag.DimensionMismatch, "every branch of s needs one dimension", "", "s = P if t > 1 mm\n  = 2*P otherwise"},
		{"s = P > 1 kN", diag.Syntax, "", "", "s = P - 1 kN"},
		{"s = grade + 1", diag.DimensionMismatch, "is a text", "", "s = 1 + 1"},
		{"check grade < \"S355\"", diag.DimensionMismatch, "texts have no order", "== and !=", "check grade == \"S355\""},
		{"check grade == 355", diag.DimensionMismatch, "`grade` is a text", "quotes", "check grade == \"S355\""},
		{"s = Q*2", diag.UnknownName, "Q is not defined", "a name is defined above its first use", "s = P*2"},
		{"s = f_x*2", diag.UnknownName, "f_x is not defined", "did you mean `f_y`?", "s = f_y*2"},
		{"s = late*2\nlate = 3 kN", diag.UsedBefore, "defined below, at line 27", "move its definition above", "late = 3 kN\ns = late*2"},
		{"s = s + 1", diag.UsedBefore, "its own definition", "a name of its own", "s = 1 + 1"},
		{"P = 3 kN", diag.Redefined, "P is already defined as a value, at line 17", "a name of its own", "P_2 = 3 kN"},
		{"pi = 3", diag.Redefined, "a constant", "", "pi_2 = 3"},
		{"sqrt(x) = x", diag.Redefined, "built-in function", "another name", "root(x) = x"},
		{"bolts = 3", diag.Redefined, "a schedule", "", "bolts_2 = 3"},
		{"s = m", diag.MissingUnit, "it is a unit", "write `1 m`", "s = 1 m"},
		{"s = 2d", diag.AmbiguousUnit, "`2d` may be 2 times the value d", "write `2*d` for the product, `2 d` for the unit", "s = 2*d"},
		{"s = 12e-6/K", diag.WrongUnitSpelling, "it is a unit", "`12e-6 1/K`", "s = 12e-6 1/K"},
		{"s = 48 kN/w", diag.WrongUnitSpelling, "`w` in `48 kN/w` is no unit", "`48 kN / w`", "s = 48 kN / d"},
		{"s = 3 kips", diag.WrongUnitSpelling, "`kip`", "", "s = 3 kip"},
		{"s = 3 foo", diag.UnknownUnit, "foo", "", "s = 3 ft"},
		{"s = f_y at grade", diag.RowMismatch, "is a plain value: `at` picks a row", "", "s = bolts.F at \"B1\""},
		{"s = bolts.F at B1", diag.UnknownName, "it is a mark of bolts", "at \"B1\"", "s = bolts.F at \"B1\""},
		{"s = bolts.F at \"B9\"", diag.UnknownMark, "bolts has no row `B9`", "B1", "s = bolts.F at \"B1\""},
		{"s = bolts.z", diag.UnknownName, "the schedule bolts has no column `z`", "x", "s = bolts.x"},
		{"s = cases.V", diag.UnknownName, "the columns of load cases are plain names", "write `V`", "s = V"},
		{"s = max(P)", diag.RowMismatch, "it has no rows for max to reduce", "compares several", "s = max(P, 2 kN)"},
		{"s = max(V over bolts)", diag.RowMismatch, "no rows of bolts: it has one entry for each of cases", "", "s = max(V over cases)"},
		{"s = max(V over walls)", diag.UnknownName, "there are no rows called `walls`", "cases", "s = max(V over cases)"},
		{"s = interpolate(bolts.x, V, 3 mm)", diag.RowMismatch, "two columns of one table", "interpolate(table.x", "s = interpolate(bolts.x, bolts.F, 3 mm)"},
		{"s = interpolate(bolts.x, bolts.F, 3 kN)", diag.DimensionMismatch, "looked up among values of another dimension", "", "s = interpolate(bolts.x, bolts.F, 3 mm)"},
		{"s = interpolate(bolts.x, bolts.F, 300 mm)", diag.OutOfRange, "outside the table, which reaches from -70.00 mm to 70.00 mm", "does not extrapolate", "s = interpolate(bolts.x, bolts.F, 30 mm)"},
		{"s = T_0 + T_0", diag.DimensionMismatch, "two temperature points cannot be added", "K or degR", "s = T_0 + 20 K"},
		{"s = 20 K - T_0", diag.DimensionMismatch, "cannot be taken from a difference", "", "s = T_0 - 20 K"},
		{"s = 2*T_0", diag.DimensionMismatch, "temperature point", "K or degR", "s = 2*20 K"},
		{"s = -T_0", diag.DimensionMismatch, "no negative", "-40 degC", "s = -20 degC"},
		{"s [degC] = 30 K", diag.DimensionMismatch, "a temperature difference", "s [K]", "s [K] = 30 K"},
		{"s [degF] = 30 K", diag.DimensionMismatch, "a temperature difference", "s [degR]", "s [degR] = 30 K"},
		{"s [K] = 30 degC", diag.DimensionMismatch, "a temperature point", "`30 K`", "s [K] = 30 K"},
		{"s = thermal_stress(12e-6 1/K, 30 degC, E)", diag.DimensionMismatch, "is a temperature point", "`30 K`", "s = thermal_stress(12e-6 1/K, 30 K, E)"},
		{"s = thermal_stress(12e-6 1/K, 30 °F, E)", diag.DimensionMismatch, "is a temperature point", "`30 degR`", "s = thermal_stress(12e-6 1/K, 30 degR, E)"},
		{"s = floor(7.5 mm)", diag.DimensionMismatch, "needs a step", "`7.5 mm, 1 mm`", "s = floor(7.5 mm, 1 mm)"},
		{"s = round(f_y)", diag.DimensionMismatch, "needs a step", "`f_y, 1 MPa`", "s = round(f_y, 1 MPa)"},
		{"s = sin(-30)", diag.BareAngle, "read as radians", "`sin(-30 deg)`", "s = sin(-30 deg)"},
		{"s = log(2)", diag.UnknownName, "there is no function `log`", "`log10`", "s = log10(2)"},
		{"s = shear_modulus(E, 0.5)", diag.OutOfRange, "does not hold: nu is 0.5", "Stable isotropic", "s = shear_modulus(E, 0.4)"},
		{"s = first of 6, 8, 10 mm with s > t", diag.DimensionMismatch, "a unit of its own", "`6 mm, 8 mm, 10 mm`", "s = first of 6 mm, 8 mm, 10 mm with s > t"},
		{"s [N] = 2*d + P where d [mm]", diag.DimensionMismatch, "cannot be added", "behind `where`", "s [N] = 2*d + P where d [mm], P [N]"},
		{"s [K] = T_0", diag.DimensionMismatch, "a temperature point", "degC", "s [degC] = T_0"},
		{"s [Hz] = omega", diag.DimensionMismatch, "the factor 2π", "omega/(2*pi)", "s [Hz] = omega/(2*pi)"},
		{"s [rad/s] = n_r", diag.DimensionMismatch, "the factor 2π", "2*pi*n_r", "s [rad/s] = 2*pi*n_r"},
		{"check omega < n_r", diag.DimensionMismatch, "the factor 2π", "", "check omega < 2*pi*n_r"},
		{"s = sin(30)", diag.BareAngle, "read as radians", "`sin(30 deg)`", "s = sin(30 deg)"},
		{"s = 48 kN/d", diag.AmbiguousUnit, "`d` in `kN/d` is read as the unit", "`48 kN / d`", "s = 48 kN / d"},
		{"s [MPa] = 48 kN/d/t", diag.DimensionMismatch, "", "`48 kN / d / t`", "s [MPa] = 48 kN / d / t"},
		{"g(x) = g(x - 1)", diag.UnknownName, "not yet defined", "cannot call itself", "g(x) = x - 1"},
		{"g(x, x) = x", diag.Redefined, "twice", "", "g(x, y) = x*y"},
		{"g(x) = x*QQ", diag.UnknownName, "QQ is not defined", "", "g(x) = x*P"},
		{"g(x) [MPa] = P/x\ns = g(d)", diag.DimensionMismatch, "in `g(x)`: g is declared in MPa", "in `P/x`", "g(x) [MPa] = P/x\ns = g(d*t)"},
		{"g(x) = 2*x\ns = g(1, 2)", diag.Syntax, "g takes 1 argument, but 2 are given", "g(x)", "g(x) = 2*x\ns = g(1)"},
		{"g(x) = 2*x\ns = g(y=1)", diag.Syntax, "g has no parameter `y`", "g(x)", "g(x) = 2*x\ns = g(x=1)"},
		{"s = sqrt(1, 2)", diag.Syntax, "sqrt takes 1 argument, but 2 are given", "sqrt(x)", "s = sqrt(2)"},
		{"s = sqrt(x=2)", diag.Syntax, "by position", "sqrt(x)", "s = sqrt(2)"},
		{"s = sqrtt(2)", diag.UnknownName, "sqrtt", "did you mean `sqrt`?", "s = sqrt(2)"},
		{"s = sqrt", diag.UnknownName, "sqrt is a function", "sqrt(x)", "s = sqrt(2)"},
		{"s = P(2)", diag.UnknownName, "P is a value", "P*(2)", "s = P*(2)"},
		{"s = direct_shear(P)", diag.Syntax, "direct_shear lacks A", "direct_shear(V, A, n=1)", "s = direct_shear(P, d^2)"},
		{"s = direct_shear(P, d)", diag.DimensionMismatch, "A of direct_shear takes an area (mm²), but `d` is a length (mm)", "", "s = direct_shear(P, d^2)"},
		{"s = direct_shear(P, d^2, planes=2)", diag.Syntax, "no parameter `planes`", "direct_shear(V, A, n=1)", "s = direct_shear(P, d^2, n=2)"},
		{"s = direct_shear(P, V=P)", diag.Syntax, "V is given twice", "", "s = direct_shear(V=P, A=d^2)"},
		{"s = direct_shear(P, d^2, n=0)", diag.OutOfRange, "the limit `n >= 1` does not hold: n is 0", "", "s = direct_shear(P, d^2, n=1)"},
		{"s = poisson_ratio(210 GPa, 69.9999 GPa)", diag.OutOfRange, "does not hold: nu is 0.500002", "Stable isotropic", "s = poisson_ratio(210 GPa, 80 GPa)"},
		{"s = section_rectangle(d, 0 mm)", diag.OutOfRange, "the limit `min(b, h) > 0` does not hold: min(b, h) is 0 mm", "Sizes are positive", "s = section_rectangle(d, 1 mm)"},
		{"s = axial_elongation(P, 1 m, d^2, -1 GPa)", diag.OutOfRange, "the limit `L > 0 and A > 0 and E > 0` does not hold: E = -1 GPa", "Sizes and the modulus", "s = axial_elongation(P, 1 m, d^2, 1 GPa)"},
		{"s = shear_strain(1 mm, 1 m)*2", diag.Syntax, "has the results gamma and gamma_small", "res.gamma", "res = shear_strain(1 mm, 1 m)\ns = res.gamma*2"},
		{"res = shear_strain(1 mm, 1 m)\ns = res*2", diag.DimensionMismatch, "res stands for a helper with 2 results", "res.gamma", "res = shear_strain(1 mm, 1 m)\ns = res.gamma*2"},
		{"res = shear_strain(1 mm, 1 m)\ns = res.delta", diag.UnknownName, "res has no result `delta`", "res.gamma", "res = shear_strain(1 mm, 1 m)\ns = res.gamma"},
		{"s = P/(t - 5 mm)", diag.NotANumber, "division by zero: `t - 5 mm` is 0", "with P = 48 kN, t = 5 mm", "s = P/(t - 4 mm)"},
		{"s = 1/(1/0)", diag.NotANumber, "division by zero", "", "s = 1/(1/2)"},
		{"s = max(-(1e200*1e200), 3)", diag.NotANumber, "no finite value", "", "s = max(-(1e2*1e2), 3)"},
		{"s = sqrt(t - d)", diag.NotANumber, "the root of a negative value", "t = 5 mm, d = 25 mm", "s = (d - t)^(1/2)"},
		{"s = ln(0)", diag.NotANumber, "not positive", "", "s = ln(1)"},
		{"s = asin(2)", diag.NotANumber, "outside -1 to 1", "", "s = asin(0.2)"},
		{"s = tan(90 deg)", diag.NotANumber, "no finite value", "", "s = tan(45 deg)"},
		{"s = P if t > d", diag.OutOfRange, "none of the conditions holds", "t = 5 mm, d = 25 mm", "s = P if t > d\n  = 2*P otherwise"},
		{"s = first of 1 mm, 2 mm with P/(d*s) <= f_y", diag.OutOfRange, "none of the 2 candidates will do: the last, 2 mm, misses with 960.0 MPa > 355 MPa, 170 % over", "further candidate", "s = first of 1 mm, 6 mm with P/(d*s) <= f_y"},
		{"s [N*mm] = 0.3*f_y*d^2.6 where f_y [MPa], d [kN]", diag.DimensionMismatch, "d is taken in kN (force), but it is a length", "", "s [N*mm] = 0.3*f_y*d^2.6 where f_y [MPa], d [mm]"},
		{"s [N*mm] = 0.3*f_y*d^2 where d [mm]", diag.DimensionMismatch, "gives a plain number in N*mm, but", "behind `where`", "s [N*mm] = 0.3*f_y*d^2 where d [mm], f_y [MPa]"},
		{"s [N*mm] = 0.3*d^2 where d [mm], t [mm]", diag.UnknownName, "t does not stand in the formula", "", "s [N*mm] = 0.3*d^2 where d [mm]"},
		{"s = 0.3*d^2.6 where d [mm]", diag.Syntax, "", "N*mm", "s [N*mm] = 0.3*d^2.6 where d [mm]"},
		{"s [°C] = 0", diag.DimensionMismatch, "0 is a plain number", "`0 °C`", "s [°C] = 0 °C"},
		{"s = abs(T_0)", diag.DimensionMismatch, "abs takes numbers", "", "s = max(T_0, 30 degC)"},
	} {
		got := faults(compile(c.line))
		if len(got) != 1 {
			t.Errorf("%s: %d faults, want 1", c.line, len(got))
			for _, d := range got {
				t.Log(d.Text())
			}
			continue
		}
		d := got[0]
		if d.ID != c.id || !strings.Contains(d.Message, c.message) || !strings.Contains(strings.Join(d.Hints, "\n"), c.hint) {
			t.Errorf("%s: want %s %q, hint %q, got %s\n%s", c.line, c.id, c.message, c.hint, d.ID, d.Text())
		}
		for _, d := range faults(compile(c.fixed)) {
			t.Errorf("the correction %q of %q has a fault:\n%s", c.fixed, c.line, d.Text())
		}
	}
}
