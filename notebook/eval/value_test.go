package eval_test

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
)

const front = "---\ncalc: T-1\nunits: [kN, mm, MPa, kN*m]\n---\n"

// compile compiles blocks of a calc file, and more files beside it.
func compile(t testing.TB, body string, more ...string) *notebook.Sheet {
	t.Helper()
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: []byte(front + body)}}
	for i := 0; i+1 < len(more); i += 2 {
		root[more[i]] = &fstest.MapFile{Data: []byte(more[i+1])}
	}
	return notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
}

// compileText compiles a block behind a table.
func compileText(lines, table string) *notebook.Sheet {
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: []byte(front + table + endTable(table) + lines)}}
	return notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
}

func endTable(table string) string {
	if table == "" {
		return ""
	}
	return "```\n"
}

// sound compiles and fails the test on any error.
func sound(t testing.TB, body string, more ...string) *notebook.Sheet {
	t.Helper()
	s := compile(t, body, more...)
	for _, d := range s.Diagnostics {
		if d.Severity == diag.Error {
			t.Fatalf("%s", d.Text())
		}
	}
	return s
}

func block(lines string) string { return "```calc\n" + strings.TrimSpace(lines) + "\n```\n" }

// find returns the step of a value, a helper's results included.
func find(s *notebook.Sheet, id string) *eval.Step {
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
	return nil
}

func text(s *eval.Step, entry int) string { return eval.PlainText(s.Printed(entry)) }

// all prints every entry of a value.
func all(s *eval.Step) string {
	var out []string
	for i := 0; i < s.Value.Len(); i++ {
		out = append(out, text(s, i))
	}
	return strings.Join(out, " | ")
}

const shared = `
P = 48 kN
d = 25 mm
t = 5 mm
f_y = 355 MPa
T_1 = 20 degC
T_2 = 68 degF
`

// What a line prints, by the rules of the notation. The figures are worked by
// hand or, where they are no round numbers, by an independent calculator.
func TestValues(t *testing.T) {
	for _, c := range []struct{ line, want string }{
		// precedence
		{"x = -2^2", "-4.000"}, {"x = 2^-1", "0.5000"}, {"x = 2^3^2", "512.0"}, {"x = (-2)^2", "4.000"},
		{"x = 8/2/2", "2.000"}, {"x = 2 - 3 - 4", "-5.000"}, {"x = 2*3 + 4*5", "26.00"}, {"x = 12/(2*3)", "2.000"}, {"x = -3*-2", "6.000"},
		{"x = 6/2*3", "9.000"}, {"x = 2·3 − 1", "5.000"}, {"x = 8÷2×3", "12.00"}, {"x = √(9)", "3.000"}, {"x = 3²", "9.000"},
		// givens keep the author's figures
		{"x = 12", "12"}, {"x = .5", ".5"}, {"x = 1.2e-3", "1.2e-3"}, {"x = 12_500 N", "12500 N"}, {"x = 5 %", "5 %"}, {"x = -3 kN", "-3 kN"}, {"x = 1.50 kN", "1.50 kN"},
		{"x = 1 3/8 in", "1 3/8 in"}, {"x = 12 ft 6 1/2 in", "12 ft 6 1/2 in"}, {"x = 5 deg 30 arcmin", "5° 30′"}, {"x = -40 degC", "-40 °C"}, {"x = \"S355\"", "S355"},
		{"x = 48kN", "48 kN"}, {"x [mm] = 1 in", "25.40 mm"}, {"x [kN] = 48 kN", "48 kN"},
		// units
		{"x = P/(2*pi*d^2/4)", "48.89 MPa"}, {"x = P*d", "1.200 kN·m"}, {"x = P/d", "1920 kN/m"}, {"x [N/mm] = P/d", "1920 N/mm"},
		{"x = 25 mm^2*2", "50.00 mm²"}, {"x = (25 mm)^2", "625.0 mm²"}, {"x = 48 kN / d", "1920 kN/m"}, {"x = 355 MPa/1.1", "322.7 MPa"},
		{"x = 490 MPa/sqrt(3)", "282.9 MPa"}, {"x = 10 mm*20 mm", "200.0 mm²"}, {"x [ksi] = f_y", "51.49 ksi"}, {"x = 1 kip*1", "4.448 kN"},
		{"x [N*mm] = 0.3*f_y*d^2.6 where f_y [MPa], d [mm]", "459191 N·mm"},
		{"x [deg] = atan(1)", "45.00°"}, {"x = sin(30 deg)", "0.5000"}, {"x = (8 mm^3)^(1/3)", "2.000 mm"}, {"x = sqrt(d*t)", "11.18 mm"}, {"x = cbrt(27 mm^3)", "3.000 mm"},
		{"x [MPa*m^(1/2)] = f_y*sqrt(pi*d)", "99.49 MPa·m¹ᐟ²"}, {"x [kN/L] = P/(d^3)", "3072 kN/L"},
		{"n = 3\nx = d^n", "15625 mm³"}, {"n = 1/2\nx = d^n*d^n", "25.00 mm"},
		// temperature
		{"x = T_1 - T_2", "0 K"}, {"x = T_1 + 30 K", "50.00 °C"}, {"x [degF] = T_1", "68.00 °F"}, {"x [degR] = T_1 - 0 degC", "36.00 °F"},
		{"x = 12e-6 1/K*(T_1 - -10 degC)*d", "0.009000 mm"}, {"x = max(T_1, T_2, 30 degC)", "30.00 °C"}, {"x = T_1 - T_2 + T_1", "20.00 °C"},
		// functions
		{"x = min(d, t)", "5.000 mm"}, {"x = max(d, 0)", "25.00 mm"}, {"x = abs(t - d)", "20.00 mm"}, {"x = hypot(3 mm, 4 mm)", "5.000 mm"},
		{"x = ceil(7.2 mm, 2 mm)", "8.000 mm"}, {"x = floor(7.9 mm, 2 mm)", "6.000 mm"}, {"x = round(5 mm, 2 mm)", "6.000 mm"}, {"x = round(-2.5)", "-3.000"}, {"x = round(2.5)", "3.000"},
		{"x = ceil(2.0000000001)", "2.000"}, {"x = floor(2.9999999999)", "3.000"}, {"x = ceil(2.00001)", "3.000"}, {"x = round(2.4999999999)", "3.000"},
		{"x = exp(0)", "1.000"}, {"x = ln(exp(2))", "2.000"}, {"x = log10(1000)", "3.000"}, {"x [deg] = atan2(1, -1)", "135.0°"}, {"x = sinh(1)^2 - cosh(1)^2", "-1.000"}, {"x = tanh(0)", "0"},
		// the dust of rounding, and zero
		{"x = 0.1 + 0.2 - 0.3", "0"}, {"x = sin(180 deg)", "0"}, {"x = P - P", "0 kN"}, {"x [kN] = 0", "0 kN"}, {"x = 1e-20 + 1e-21", "1.100e-20"},
		// choices
		{"x = 0.85 if d <= 25 mm\n  = 0.75 if d <= 40 mm\n  = 0.65 otherwise", "0.8500"},
		{"x = 0.85 if d < 25 mm\n  = 0.75 if d <= 40 mm\n  = 0.65 otherwise", "0.7500"},
		{"x = 1/(t - 5 mm) if t > 5 mm\n  = 0 otherwise", "0 1/m"}, {"x = 1 if t > 5 mm and 1/(t - 5 mm) > 3 1/mm\n  = 2 otherwise", "2.000"},
		{"x = 1 if not t > 5 mm or d < t\n  = 2 otherwise", "1.000"}, {"x = 1 if 4 mm < t <= 5 mm\n  = 2 otherwise", "1.000"}, {"g = \"a\"\nx = 1 if g == \"a\"\n  = 2 otherwise", "1.000"},
		// functions of the author's own
		{"g(F, a) [MPa] = F/a\nx = g(P, d*t)", "384.0 MPa"}, {"g(F, a) = F/a\nx = g(a=d, F=P)", "1920 kN/m"}, {"g(z) = z*t\nh(z) = g(z)^2\nx = h(2)", "100.0 mm²"},
		{"g(F, a) [MPa] = F/(a*t)\nx = g(0, d)", "0 MPa"},
		{"direct_shear(V) = 2*V\nx = direct_shear(3 kN)", "6.000 kN"},
		// first of
		{"x = first of 1 mm, 4 mm, 8 mm with x > t", "8.000 mm"},
		// names
		{"τ_d = 3 MPa\nx = 2*tau_d", "6.000 MPa"}, {"ϕ = 2\nx = phi*φ", "4.000"}, {"min = 3\nx = min(min, 2)", "2.000"}, {"x' = 3\nx = x'*2", "6.000"},
	} {
		s := compile(t, block(shared+c.line))
		st := find(s, "x")
		if st == nil || st.Failed {
			t.Errorf("%s: not computed", c.line)
			for _, d := range s.Diagnostics {
				if d.Severity == diag.Error {
					t.Log(d.Text())
				}
			}
			continue
		}
		if got := text(st, st.Entry); got != c.want {
			t.Errorf("%s: got %s, want %s", c.line, got, c.want)
		}
	}
}

// The utilisation and the verdict of a check.
func TestChecks(t *testing.T) {
	for _, c := range []struct {
		check string
		ok    bool
		util  string // "" where there is none
	}{
		{"check 3 kN <= 4 kN", true, "0.75"}, {"check 4 kN >= 3 kN", true, "0.75"}, {"check 5 kN <= 4 kN", false, "1.25"},
		{"check 3 kN <= 3 kN", true, "1.00"}, {"check 3 kN < 3 kN", false, "1.00, equal"}, {"check 3 kN > 3 kN", false, "1.00, equal"},
		{"check 3 kN <= 2.9999999999 kN", true, "1.00"}, {"check 3 kN <= 2.9999 kN", false, "1.01"}, {"check 0.333 <= 1", true, "0.34"}, {"check 0.07*1 <= 1", true, "0.07"},
		{"check 0 kN <= 4 kN", true, ""}, {"check -3 kN <= 4 kN", true, ""}, {"check 3 kN == 3 kN", true, ""}, {"check 3 kN == 4 kN", false, ""},
		{"check 20 degC <= 30 degC", true, ""}, {"check \"a\" == \"a\"", true, ""}, {"check 1 mm <= 2 mm <= 4 mm", true, "0.50"}, {"check 1 mm <= 3 mm <= 4 mm", true, "0.75"},
		{"check 1 mm <= 5 mm <= 4 mm", false, "1.25"}, {"check (3 kN/(4 kN))^2 <= 1", true, "0.57"}, {"check 4 mm >= 3 mm >= 1 mm", true, "0.75"},
		{"check 5 kN <= 4 kN if 1 > 2", true, ""}, {"check 5 kN <= 4 kN if 2 > 1", false, "1.25"},
	} {
		s := sound(t, block(c.check))
		st := s.Steps[len(s.Steps)-1]
		r := st.Check
		if got := eval.UtilisationText(r.Ratio[r.Governs], r.AllOK, r.Equal); r.AllOK != c.ok || got != c.util {
			t.Errorf("%s: got %v %q, want %v %q", c.check, r.AllOK, got, c.ok, c.util)
		}
	}
}

const rows = "```schedule bolts\nmark | x [mm] | y [mm] | A\nB1 | -70 | 75 | 1 cm^2\nB2 | 70 | 75 | 200 mm^2\nB3 | 0 | -150 | 2*1 cm^2\n```\n" +
	"```cases\ncase | V [kN] | M\nLC1 | 30 | 5 kN*m\nLC2 | 60 | -2 kN*m\n```\n" +
	"```schedule steels\nmark | f_y [MPa] | t_max [in]\nS235 | 235 | 5/8\nS355 | 355 | 1 1/8\n```\n" +
	"```schedule plates\nmark | t [mm]\nP6 | 6\nP8 | 8\nP10 | 10\n```\n" +
	"```schedule members\nmark | N [kN] | grade\nM1 | 100 | S355\nM2 | 50 | S235\nM3 | 300 | S355\n```\n"

// Rows, by section 5 of the notation; every entry is worked by hand.
func TestRows(t *testing.T) {
	for _, c := range []struct{ line, want string }{
		{"q = bolts.x", "-70.00 mm | 70.00 mm | 0 mm"}, {"q = bolts.A", "1.000 cm² | 2.000 cm² | 2.000 cm²"},
		{"q = bolts.x*2", "-140.0 mm | 140.0 mm | 0 mm"}, {"q = hypot(bolts.x, bolts.y)", "102.6 mm | 102.6 mm | 150.0 mm"},
		{"q = V + bolts.x*1 kN/mm", "-40.00 kN | -10.00 kN | 100.0 kN | 130.0 kN | 30.00 kN | 60.00 kN"},
		{"q = sum(bolts.x)", "0 mm"}, {"q = count(bolts.x)", "3.000"}, {"q = mean(bolts.y)", "0 mm"}, {"q = extreme(bolts.y)", "-150.0 mm"}, {"q = max(bolts.y)", "75.00 mm"},
		{"g = V*bolts.x\nq = max(g over bolts)", "2.100 kN·m | 4.200 kN·m"}, {"g = V*bolts.x\nq = max(g over cases)", "-2.100 kN·m | 4.200 kN·m | 0 kN·m"},
		{"g = V*bolts.x\nq = max(g)", "4.200 kN·m"},
		{"q = max(V, 40 kN)", "40.00 kN | 60.00 kN"}, {"q = steels.f_y at \"S355\"", "355.0 MPa"}, {"q = 2*steels.f_y at \"S355\"", "710.0 MPa"}, {"q [in] = steels.t_max at \"S235\"", "0.6250 in"},
		{"q = steels.f_y at members.grade", "355.0 MPa | 235.0 MPa | 355.0 MPa"}, {"g = V*bolts.x\nq = g at \"B2\"", "2.100 kN·m | 4.200 kN·m"}, {"g = V*bolts.x\nq = g at \"LC2\"", "-4.200 kN·m | 4.200 kN·m | 0 kN·m"},
		{"h = steels.f_y/1.1\nq = h at \"S235\"", "213.6 MPa"}, {"q = interpolate(plates.t, plates.t^2, 7 mm)", "50.00 mm²"}, {"q = interpolate(plates.t, plates.t, V*0.1 mm/kN + 3 mm)", "6.000 mm | 9.000 mm"},
		{"q = first of plates.t with members.N/(q*100 mm) <= 400 MPa", "6.000 mm | 6.000 mm | 8.000 mm"},
		{"q = first of plates.mark with members.N/(plates.t*100 mm) <= 400 MPa", "P6 | P6 | P8"},
		{"s = first of plates.mark with members.N/(plates.t*100 mm) <= 400 MPa\nq = plates.t at s", "6.000 mm | 6.000 mm | 8.000 mm"},
		{"q = first of 2 mm, 10 mm with members.N/(q*100 mm) <= 400 MPa", "10.00 mm | 2.000 mm | 10.00 mm"},
		{"s = first of plates.t with s > 7 mm\nw = plates.t*2\nq = w at s", "16.00 mm"},
		{"q = 1 if V > 40 kN\n  = 2 otherwise", "2.000 | 1.000"}, {"q = 1 kN/(V - 30 kN) if V > 30 kN\n  = 7 otherwise", "7.000 | 0.03333"},
		{"g(x) = 2*x\nq = g(V)", "60.00 kN | 120.0 kN"}, {"g(x) = max(x)\nq = g(V)", "60.00 kN"}, {"g(x, y) = x*y\nq = g(V, bolts.x)", "-2.100 kN·m | -4.200 kN·m | 2.100 kN·m | 4.200 kN·m | 0 kN·m | 0 kN·m"},
		{"q = direct_shear(V, 100 mm^2)", "300.0 MPa | 600.0 MPa"}, {"q = 2*direct_shear(V, bolts.A)", "600.0 MPa | 1200 MPa | 300.0 MPa | 600.0 MPa | 300.0 MPa | 600.0 MPa"},
		{"q = max(direct_shear(V, bolts.A) over bolts)", "300.0 MPa | 600.0 MPa"},
	} {
		s := compile(t, rows+block(c.line))
		st := find(s, "q")
		if st == nil || st.Failed {
			t.Errorf("%s: not computed", c.line)
			for _, d := range s.Diagnostics {
				if d.Severity == diag.Error {
					t.Log(d.Text())
				}
			}
			continue
		}
		if got := all(st); got != c.want {
			t.Errorf("%s: got %s, want %s", c.line, got, c.want)
		}
	}
}

// The printed entry is the one that governs the worst check downstream.
func TestGoverning(t *testing.T) {
	s := sound(t, rows+block(`
F = abs(V*bolts.x/(1 m) + M*bolts.y/(1 m^2))
tau = F/(100 mm^2)
check tau <= 100 MPa
unchecked = V*2
last = 1
`))
	for _, c := range []struct {
		id   string
		want string
	}{{"F", "B1, LC2"}, {"tau", "B1, LC2"}, {"V", "LC2"}, {"M", "LC2"}, {"unchecked", "LC2"}} {
		st := find(s, c.id)
		if got := st.Value.Type.Mark(st.Entry); got != c.want {
			t.Errorf("%s: printed for %q, want %q", c.id, got, c.want)
		}
	}
	check := s.Steps[len(s.Steps)-3]
	if got := check.Check.Type.Mark(check.Check.Governs); got != "B1, LC2" {
		t.Errorf("the check governs at %q", got)
	}
}

// Of a check that no entry needs the nearest to it is told of.
func TestNearestToRequired(t *testing.T) {
	for _, c := range []struct{ cond, want string }{
		{"bolts.x > 500 mm", "B2"},
		{"bolts.y < -500 mm", "B3"},
		{"V > 400 kN", "LC2"},
		{"0.2 m < bolts.x < 0.3 m", "B2"},
		{"V == 500 kN", "LC2"},
		{"V > 400 kN and M > 0 kN*m", "LC1"}, // the first: these have no common measure
	} {
		s := sound(t, rows+block("check V*bolts.A/(1 mm^2) <= 1 kN if "+c.cond+"\n"))
		r := s.Steps[len(s.Steps)-1].Check
		if got := r.Type.Mark(r.Governs); !strings.Contains(got, c.want) {
			t.Errorf("%s: %s is told of, want %s", c.cond, got, c.want)
		}
	}
}

// A helper's parameters print the author's own figures of a schedule's cell.
func TestOwnFiguresOfCells(t *testing.T) {
	s := sound(t, rows+"```helper third\na [length]\nb [length]\nt [force] = (a + b)*1 N/mm\ngives t\n```\n"+
		"```helper middle\nx [column of length]\nm [length] = mean(x)\ngives m\n```\n"+
		block("F = third(bolts.x, bolts.x*2)\nbig = max(F)\nc = middle(bolts.y)"))
	var got []string
	for _, call := range find(s, "F").Calls {
		for _, arg := range call.Args {
			got = append(got, eval.PlainText(arg.Printed(0)))
		}
	}
	for _, call := range find(s, "c").Calls {
		got = append(got, eval.PlainText(call.Args[0].Printed(2)))
	}
	if want := []string{"-70 mm", "-140.0 mm", "-150 mm"}; !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

// Standard gravity prints in the unit of its file's system.
func TestGravityInTheSystem(t *testing.T) {
	for system, want := range map[string]string{"SI": "9.807 m/s²", "US": "32.17 ft/s²"} {
		root := fstest.MapFS{"t.md": &fstest.MapFile{Data: []byte("---\ncalc: T\nsystem: " + system + "\n---\n" + block("m = 2 kg\nW = m*g_n"))}}
		s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "t.md")
		for _, used := range s.Steps[len(s.Steps)-1].Uses {
			if got := eval.PlainText(used.Printed(0)); used.ID == "g_n" && got != want {
				t.Errorf("%s: got %s, want %s", system, got, want)
			}
		}
	}
}

// Of equal entries the first governs, whatever the last bits say, and what a
// plain value was reduced from is printed for its own entry, not for that of a
// check further down.
func TestGoverningTiesAndPlain(t *testing.T) {
	for _, c := range []struct{ lines, id, want string }{
		{"a = 0.3*V/V if V < 40 kN\n  = 3*0.1*V/V otherwise\ncheck a <= 1", "a", "LC1"},
		{"worst = max(V)\nneed = 50 kN + M/(1 m)\ncheck need <= worst", "need", "LC1"},
		{"worst = max(V)\nneed = 50 kN + M/(1 m)\ncheck need <= worst", "M", "LC1"},
		{"worst = max(V)\nneed = 50 kN + M/(1 m)\ncheck need <= worst", "V", "LC2"},
		{"worst = max(V)\ncheck worst <= 70 kN", "V", "LC2"},
	} {
		st := find(sound(t, rows+block(c.lines)), c.id)
		if got := st.Value.Type.Mark(st.Entry); got != c.want {
			t.Errorf("%q: %s is printed for %q, want %q", c.lines, c.id, got, c.want)
		}
	}
	if x := find(sound(t, rows+block("a = 0.3*V/V if V < 40 kN\n  = 3*0.1*V/V otherwise")), "a").Value.Num; x[1] <= x[0] {
		t.Errorf("the entries %v do not differ in the last bits", x)
	}
}

// A side of a check that is only a name without a unit is shown in degrees or
// percent where the other side is.
func TestSidesInDegreesAndPercent(t *testing.T) {
	for _, c := range []struct{ lines, want string }{
		{"x = 0.01\nlim = 1 deg\ncheck x <= lim", "0.5730° 1.000°"},
		{"x = 0.01\ncheck x <= 1 deg", "0.5730° 1.000°"},
		{"x [mrad] = 0.01\ncheck x <= 1 deg", "10.00 mrad 1.000°"},
		{"x = 0.01\nlim = 5 %\ncheck lim >= x", "5.000 % 1.000 %"},
		{"x = 0.01\ncheck x <= 1", "0.01000 1.000"},
		{"lim = 1 deg\ncheck lim >= 0.01", "1.000° 0.01000"},
		{"x = 0.01\ny = 0.02\ncheck x <= y", "0.01000 0.02000"},
	} {
		s := sound(t, block(c.lines))
		var got []string
		for _, side := range s.Steps[len(s.Steps)-1].Check.Sides {
			got = append(got, eval.PlainText(side.Value.Printed(0, side.Unit, side.Figures)))
		}
		if strings.Join(got, " ") != c.want {
			t.Errorf("%q: got %q, want %q", c.lines, got, c.want)
		}
	}
}

// A set of rows is what its defining block made it, whichever way it is
// carried; sets of different files with a mark in common are never paired.
func TestCarriedRows(t *testing.T) {
	const loads = "---\ncalc: L\n---\n```cases\ncase | N [kN]\nLC1 | 1\nLC2 | 2\n```\n"
	const other = "---\ncalc: O\nfrom: {loads: loads.md}\n---\n```calc\nQ = 2*loads.N\n```\n"
	const rival = "---\ncalc: R\n---\n```cases\ncase | N [kN]\nLC1 | 1\nLC9 | 2\n```\n"
	compileWith := func(line string) *notebook.Sheet {
		root := fstest.MapFS{}
		for name, data := range map[string]string{"loads.md": loads, "other.md": other, "rival.md": rival,
			"calc.md": "---\ncalc: C\nfrom: {loads: loads.md, other: other.md, rival: rival.md}\n---\n" + block(line)} {
			root[name] = &fstest.MapFile{Data: []byte(data)}
		}
		return notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
	}
	for _, c := range []struct{ line, want string }{
		{"q = loads.N + other.Q", "3.000 kN | 6.000 kN"},
		{"q = max(loads.N over loads.cases)", "2.000 kN"},
		{"q = loads.N", "1 kN | 2 kN"},
	} {
		s := compileWith(c.line)
		if st := find(s, "q"); st == nil || st.Failed || all(st) != c.want {
			t.Errorf("%s: got %v", c.line, st)
			for _, d := range s.Diagnostics {
				t.Log(d.Text())
			}
		}
	}
	s := compileWith("q = loads.N + rival.N")
	found := false
	for _, d := range s.Diagnostics {
		found = found || d.ID == diag.RowMismatch && strings.Contains(d.Message, "`LC1`")
	}
	if !found {
		t.Error("two sets of rows with a mark in common were paired silently")
	}
}

// Worked results of textbooks and standards, all from memory of the
// publications; the expected figures follow from the formulas there.
func TestWorkedExamples(t *testing.T) {
	for _, c := range []struct {
		source, lines, want string
		tolerance           float64
	}{
		{"Gere & Goodno, Mechanics of Materials, section 1.2: axial stress of a hollow strut", "x [MPa] = 240 kN/(pi/4*((130 mm)^2 - (90 mm)^2))", "34.7", 0.01},
		{"Gere & Goodno, section 2.2: elongation PL/EA of a prismatic bar", "x [mm] = 20 kN*3 m/(200 GPa*300 mm^2)", "1.0", 1e-9},
		{"Gere & Goodno, section 1.8: average shear stress V/A in double shear", "x = direct_shear(54 kN, pi*(12 mm)^2/4, n=2)", "238.7", 0.001},
		{"Gere & Goodno, section 1.8: punching a plate, shear area pi*d*t", "x [MPa] = 110 kN/(pi*20 mm*8 mm)", "218.8", 0.001},
		{"Gere & Goodno, section 1.7: G = E/(2*(1 + nu)) of steel", "x [GPa] = shear_modulus(200 GPa, 0.3)", "76.92", 0.001},
		{"Roark, Table 2: Hooke's law in shear, gamma = tau/G", "x = 40 MPa/(80 GPa)", "5e-4", 1e-9},
		{"Beer & Johnston, Mechanics of Materials, section 1.4: single shear of a pin", "x [MPa] = 50 kN/(pi*(25 mm)^2/4)", "101.86", 0.001},
		{"Timoshenko, Strength of Materials I, art. 1: stress P/A in US units", "x [psi] = 10 kip/(2 in^2)", "5000", 1e-9},
		{"EN 1993-1-8, Table 3.4: shear of an M20 8.8 bolt, one plane, A_s = 245 mm2", "x [kN] = 0.6*800 MPa*245 mm^2/1.25", "94.08", 1e-6},
		{"EN 1993-1-1, 6.2.6: plastic shear resistance A_v*f_y/sqrt(3)", "x [kN] = 1000 mm^2*355 MPa/sqrt(3)", "204.96", 1e-4},
		{"EN 1995-1-1, (8.14): yield moment of a 3.75 mm nail of 600 N/mm2", "f = 600 MPa\nd = 3.75 mm\nx [N*mm] = 0.3*f*d^2.6 where f [MPa], d [mm]", "5593.7", 1e-3},
		{"AISC Manual, Table 7-1: 3/4 in A325-N bolt in single shear, phi 0.75, F_nv 54 ksi", "x [kip] = 0.75*54 ksi * pi*(3/4 in)^2/4", "17.9", 0.002},
	} {
		st := find(sound(t, block(c.lines)), "x")
		got := st.Unit.FromSI(st.Value.Num[0])
		var want float64
		fmt.Sscan(c.want, &want)
		if math.Abs(got-want) > c.tolerance*want {
			t.Errorf("%s: got %g, want %s", c.source, got, c.want)
		}
	}
}
