package maths_test

import (
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render/maths"
)

// givens stand above every line of the tables.
const givens = `P = 48 kN
N = -3 kN
d = 25 mm
t = 5 mm
A = 490.9 mm^2
f_y = 355 MPa
gamma_M = 1.5
theta = 30 deg
x = 2
n = 4
L = 12 ft 6 in
w = 1 1/4 in
sigma_1 = 120 MPa
sigma_2 = -40 MPa
f_c' = 4 ksi
Load = 7
eps = 6.036e-4
T_1 = 20 degC
T_2 = -40 degC
q = 0.3 N/mm
phi = 1.5e-4 deg
kappa = 77.42 1/m
grade = "S355"
bearing(F, a, b) [MPa] = F/(a*b)
`

// last compiles a line of a calc and returns its step.
func last(t *testing.T, line string) *eval.Step {
	t.Helper()
	text := "---\ncalc: T\n---\n\n```schedule bolts\nmark | x [mm] | y [mm]\nB1 | -70 | 75\nB2 | 70 | 75\nB3 | -70 | 0\nB4 | 70 | 0\nB5 | -70 | -75\nB6 | 70 | -76\n```\n\n" +
		"```schedule steels\ngrade | f_y [MPa]\nS235 | 235\nS355 | 355\n```\n\n```calc\n" + givens + line + "\n```\n"
	s := notebook.Compile(&notebook.Context{FS: fstest.MapFS{"t.md": {Data: []byte(text)}}, Panics: true}, "t.md")
	if s.Failed() {
		t.Fatalf("%s: %s", line, s.Diagnostics[0].Text())
	}
	return s.Steps[len(s.Steps)-1]
}

// sides are a definition's right side as written and with the values put in, ""
// where that is no different.
func sides(t *testing.T, line string) (written, put string) {
	t.Helper()
	s := last(t, line)
	b := maths.NewBuilder()
	written = string(maths.AppendPlain(nil, b.Written(s)))
	d := s.Stmt.(*syntax.Definition)
	if n := b.Put(d.Branches[maths.Taken(s, s.Entry)].Value, s, s.Value.Type, s.Entry); n != nil {
		put = string(maths.AppendPlain(nil, n))
	}
	return written, put
}

func TestExpressions(t *testing.T) {
	for _, c := range []struct{ line, written, put string }{
		// fractions, products and what stands between factors
		{"a = P/(2*A)", "P/(2·A)", "48 kN/(2·490.9 mm²)"},
		{"a = pi*d^2/4", "π·d²/4", "π·(25 mm)²/4"},
		{"a = f_y/(sqrt(3)*gamma_M)", "f_y/(√3·γ_M)", "355 MPa/(√3·1.5)"},
		{"a = P/(d*t)", "P/(d·t)", "48 kN/(25 mm · 5 mm)"},
		{"a = P/d/t", "P/(d·t)", "48 kN/(25 mm · 5 mm)"},
		{"a = -sigma_2*x", "−σ_2·x", "−(−40 MPa)·2"},
		{"a = sigma_1 + (-sigma_2)*x", "σ_1 + (−σ_2·x)", "120 MPa + (−(−40 MPa)·2)"},
		{"a = 1/2*x", "1/2·x", "1/2·2"},
		{"a = (x/n)/(n/x)", "x/n/(n/x)", "2/4/(4/2)"},
		{"a = (x/n*x)/n", "(x/n)·x/n", "(2/4)·2/4"},
		{"a = 1/(x/n*x)", "1/((x/n)·x)", "1/((2/4)·2)"},
		{"a = x^(1/n)", "x^(1/n)", "2^(1/4)"},
		{"a = 2*3 mm", "2·3 mm", ""},
		// brackets that stay and brackets that go
		{"a = (x + n)*x", "(x + n)·x", "(2 + 4)·2"},
		{"a = x - (n - x)", "x − (n − x)", "2 − (4 − 2)"},
		{"a = x + (n - x)", "x + n − x", "2 + 4 − 2"},
		{"a = (x*n) + (x/n)", "x·n + x/n", "2·4 + 2/4"},
		{"a = ((x))", "x", "2"},
		{"a = (x + n)^2", "(x + n)²", "(2 + 4)²"},
		{"a = (x^n)^2", "(x^n)²", "(2⁴)²"},
		{"a = x^n^2", "x^(n²)", "2^(4²)"},
		{"a = -x^2", "−x²", "−2²"},
		{"a = (-x)^2", "(−x)²", "(−2)²"},
		{"a = -x*n", "−x·n", "−2·4"},
		{"a = x - -n", "x − (−n)", "2 − (−4)"},
		// values that need brackets where they stand
		{"a = P + N", "P + N", "48 kN + (−3 kN)"},
		{"a = N + P", "N + P", "−3 kN + 48 kN"},
		{"a = P - N", "P − N", "48 kN − (−3 kN)"},
		{"a = x*N", "x·N", "2·(−3 kN)"},
		{"a = N/x", "N/x", "−3 kN/2"},
		{"a = N^2", "N²", "(−3 kN)²"},
		{"a = sqrt(sigma_1^2 - sigma_1*sigma_2)", "√(σ_1² − σ_1·σ_2)", "√((120 MPa)² − 120 MPa · (−40 MPa))"},
		{"a = x^2", "x²", "2²"},
		{"a = eps^2", "eps²", "(6.036×10⁻⁴)²"},
		{"a = x*L", "x·L", "2·(12 ft 6 in)"},
		{"a = L/x", "L/x", "(12 ft 6 in)/2"},
		{"a = L^2", "L²", "(12 ft 6 in)²"},
		{"a = x*w", "x·w", "2·(1 1/4 in)"},
		{"a = T_1 - T_2", "T_1 − T_2", "20 °C − (−40 °C)"},
		{"a = x*5 %", "x·5 %", "2·5 %"},
		// a unit with a division before a slash, a power of ten behind a function
		{"a = q/x", "q/x", "(0.3 N/mm)/2"},
		{"a = P/(1 + q/x/(1 N/mm))", "P/(1 + q/(x·1 N/mm))", "48 kN/(1 + (0.3 N/mm)/(2·1 N/mm))"},
		{"a = 1/(x*q/n)", "1/(x·q/n)", "1/((2·0.3 N/mm)/4)"},
		{"a = x*kappa", "x·κ", "2·77.42 1/m"},
		{"a = sin(phi)", "sin φ", "sin(1.5×10⁻⁴ °)"},
		// names
		{"a = f_c'/x", "f_c′/x", "4 ksi/2"},
		{"a = Load*x", "Load·x", "7·2"},
		{"a = g_n*x", "g_n·x", "9.807 m/s² · 2"},
		// functions
		{"a = sin(theta)", "sin θ", "sin 30°"},
		{"a = x*sin(theta)", "x·sin θ", "2·sin 30°"},
		{"a = sin(theta)*x", "(sin θ)·x", "(sin 30°)·2"},
		{"a = sin(theta)^2", "sin² θ", "sin² 30°"},
		{"a = cos(theta/x)^x", "cos(θ/x)^x", "cos(30°/2)²"},
		{"a = asin(x/n)", "arcsin(x/n)", "arcsin(2/4)"},
		{"a = cbrt(x)", "³√x", "³√2"},
		{"a = sqrt(x)^3", "(√x)³", "(√2)³"},
		{"a = abs(N)", "|N|", "|−3 kN|"},
		{"a = log10(n)", "log_10(n)", "log_10(4)"},
		{"a = exp(-x)", "exp(−x)", "exp(−2)"},
		{"a = hypot(P, N)", "√(P² + N²)", "√((48 kN)² + (−3 kN)²)"},
		{"a = hypot(P, hypot(P, N))", "√(P² + (√(P² + N²))²)", "√((48 kN)² + (√((48 kN)² + (−3 kN)²))²)"},
		{"a = max(x, n)", "max(x, n)", "max(2, 4)"},
		{"a = ceil(d, 2 mm)", "ceil(d, 2 mm)", "ceil(25 mm, 2 mm)"},
		{"a = x*bearing(P, d, t)", "x·bearing(P, d, t)", "2·384.0 MPa"},
		// rows
		{"a = sum(bolts.x^2)", "Σ_bolts(x_bolts²)", "(−70 mm)² + (70 mm)² + … + (70 mm)²"},
		{"a = sum(steels.f_y)", "Σ_steels(f_y_steels)", "235 MPa + 355 MPa"},
		{"a = max(bolts.y)", "max(y_bolts)", "max(75 mm, 75 mm, …, −76 mm)"},
		{"a = min(bolts.y over bolts)", "min_bolts(y_bolts)", "min_bolts(75 mm, 75 mm, …, −76 mm)"},
		{"a = extreme(bolts.y)", "extreme(y_bolts)", "extreme(75 mm, 75 mm, …, −76 mm)"},
		{"a = max(-bolts.x - 2*bolts.y)", "max(−x_bolts − 2·y_bolts)", "max(−(−70 mm) − 2·75 mm, −70 mm − 2·75 mm, …, −(−70 mm) − 2·(−75 mm), −70 mm − 2·(−76 mm))"},
		{"a = min(bolts.x^2/(-abs(bolts.y) - 1 mm))", "min(x_bolts²/(−|y_bolts| − 1 mm))",
			"min((−70 mm)²/(−|75 mm| − 1 mm), (70 mm)²/(−|75 mm| − 1 mm), (−70 mm)²/(−|0 mm| − 1 mm), …, (70 mm)²/(−|−76 mm| − 1 mm))"},
		{"a = count(bolts.x)", "count(x_bolts)", ""},
		{"a = x*max(steels.f_y)", "x·max(f_y_steels)", "2·max(235 MPa, 355 MPa)"},
		{"a = steels.f_y at grade", "f_y_steels at grade", "f_y_steels at S355"},
		{"a = x*(steels.f_y at grade)", "x·(f_y_steels at grade)", "2·355 MPa"},
		{`a = steels.f_y at "S235"`, "f_y_steels at S235", ""},
		// one set within and about a reduction: the round within is its own
		{"a = steels.f_y/sum(steels.f_y)", "f_y_steels/Σ_steels(f_y_steels)", "355 MPa/(235 MPa + 355 MPa)"},
		{"a = steels.f_y/max(steels.f_y)", "f_y_steels/max(f_y_steels)", "355 MPa/max(235 MPa, 355 MPa)"},
		{"a = count(steels.f_y)*steels.f_y", "count(f_y_steels)·f_y_steels", "count(f_y_steels)·355 MPa"},
		{`a = steels.f_y - (steels.f_y at "S235")`, "f_y_steels − (f_y_steels at S235)", "355 MPa − 235 MPa"},
		// choices and empirical rules
		{"a = 0.85 if t <= 25 mm\n  = x if t <= 40 mm and not x > 3 or n == 1\n  = 0.65 otherwise",
			"{0.85 if t ≤ 25 mm ←; x if t ≤ 40 mm and not x > 3 or n = 1; 0.65 otherwise}", ""},
		{"a = x if t > 25 mm\n  = n*x otherwise", "{x if t > 25 mm; n·x otherwise ←}", "4·2"},
		{"a [N*mm] = 0.3*f_y*d^2.6 where f_y [MPa], d [mm]", "0.3·f_y·d^2.6", "0.3·355·25^2.6"},
		{"a [N*mm] = 0.3*f_y*d^2.6 where f_y [ksi], d [in]", "0.3·f_y·d^2.6", "0.3·51.49·0.9843^2.6"},
		{"a = first of 6 mm, 8 mm with a >= d/4", "first of 6 mm, 8 mm with a ≥ d/4", "first of 6 mm, 8 mm with a ≥ 25 mm/4"},
	} {
		written, put := sides(t, c.line)
		if written != c.written || put != c.put {
			t.Errorf("%s\n got %s = %s\nwant %s = %s", c.line, written, put, c.written, c.put)
		}
	}
}

// Every value in a formula leads to where it was defined, and tells its
// derivation.
func TestRefs(t *testing.T) {
	s := last(t, "b_1 = P/(2*A)  # Stress [a book]\nb_2 = 2*b_1")
	b := maths.NewBuilder()
	value, ok := b.Value(s.Uses[0], 0).(maths.Number)
	if !ok {
		t.Fatal("no number")
	}
	want := "b_1 = P/(2·A) = 48.89 MPa (2)\nStress [a book]"
	if value.Target != "v-b_1" || value.Tip != want {
		t.Errorf("got %q, %q", value.Target, value.Tip)
	}
	html := string(maths.AppendMathML(nil, b.Written(s)))
	if !strings.Contains(html, `href="#v-b_1"`) {
		t.Errorf("no link to the definition: %s", html)
	}
	if strings.Contains(string(maths.AppendMathML(nil, b.Written(last(t, "a = pi*x")))), "#v-pi") {
		t.Error("π leads nowhere and has a link")
	}
}

// The entry that min and max take is marked. Literals count among what they
// choose from; names of `where` count in their units.
func TestGoverns(t *testing.T) {
	for _, c := range []struct{ line, governs string }{
		{"a = max(x, n)", "4"},
		{"a = min(P, N)", "-3"},
		{"a = max(bolts.y)", "75"},
		{"a = min(bolts.y)", "-76"},
		{"a = extreme(bolts.y)", "-76"},
		{"a = max(x, n + 1)", ""},
		{"a = min(x, 2.5, n)", "2"},
		{"a = min(x, 1, n)", "1"},
		{"a = max(x, 2.5)", "2.5"},
		{"a = max(0, N)", "0"},
		{"a = min(t, 1 in)", "5"},
		{"a = max(t, 1 in)", "1"},
		{"a = max(T_2, 30 degF)", "30"},
		{"a [mm] = max(t, 0.003) where t [m]", "0.005000"},
		{"a [mm] = min(t, 0.003) where t [m]", "0.003"},
		{"a [mm] = min(t, 40) where t [mm]", "5"},
		{"a = max(-30 degC, T_2)", "-30"},
	} {
		s := last(t, c.line)
		d := s.Stmt.(*syntax.Definition)
		n := maths.NewBuilder().Put(d.Branches[0].Value, s, s.Value.Type, 0)
		if got := marked(n); got != c.governs {
			t.Errorf("%s: %q is marked, want %q", c.line, got, c.governs)
		}
	}
}

// What stands before a dot comes last in the subscript, parted as a name is.
func TestNameBeforeTheDot(t *testing.T) {
	for name, want := range map[string]string{"bolts.x": "bolts", "jnt_a.F_v_Rk": "v Rk jnt a", "p_c.u": "p c", "s_1'.A": "s 1′", "σ_1.x": "σ 1"} {
		if got := strings.Join(maths.NewBuilder().Name(name).(maths.Symbol).Sub, " "); got != want {
			t.Errorf("%s: the subscript is %q, want %q", name, got, want)
		}
	}
}

// Of equal entries the first is marked, whatever the last bits say.
func TestGovernsFirstOfEqual(t *testing.T) {
	s := last(t, "b = 0.3*steels.f_y/steels.f_y if steels.f_y < 300 MPa\n  = 3*0.1*steels.f_y/steels.f_y otherwise\na = max(b)")
	d := s.Stmt.(*syntax.Definition)
	row := maths.NewBuilder().Put(d.Branches[0].Value, s, s.Value.Type, 0)
	text := string(maths.AppendMathML(nil, row))
	if mark, other := strings.Index(text, `<mn class="g">0.3000`), strings.Index(text, `<mn>0.3000`); mark < 0 || other < mark {
		t.Errorf("the first entry is not the one marked: %s", text)
	}
}

func marked(n maths.Node) string {
	switch n := n.(type) {
	case maths.Row:
		for _, c := range n {
			if m := marked(c); m != "" {
				return m
			}
		}
	case maths.Fence:
		return marked(n.Body)
	case maths.Number:
		if n.Governs {
			return n.Value
		}
	}
	return ""
}

func BenchmarkWritten(b *testing.B) {
	t := &testing.T{}
	s := last(t, "a = sqrt((P/A)^2 + 3*(f_y/gamma_M)^2)")
	b.ReportAllocs()
	for b.Loop() {
		maths.NewBuilder().Written(s)
	}
}
