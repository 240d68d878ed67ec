package eval_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/interp"
	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"gusset/notebook/diag"
)

// Linear interpolation agrees with gonum's over the whole table, its points
// included, and refuses what lies outside.
func TestInterpolateAgainstGonum(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(2, 9).Draw(t, "points")
		xs, ys := make([]float64, n), make([]float64, n)
		x := rapid.Float64Range(-50, 50).Draw(t, "first")
		table := "```schedule t\nx | y\n"
		for i := range n {
			xs[i], ys[i] = x, rapid.Float64Range(-1000, 1000).Draw(t, "y")
			x += rapid.Float64Range(0.01, 20).Draw(t, "step")
			table += fmt.Sprintf("%.17g | %.17g\n", xs[i], ys[i])
		}
		var line interp.PiecewiseLinear
		if err := line.Fit(xs, ys); err != nil {
			t.Fatal(err)
		}
		at := append([]float64{}, xs...)
		for range 5 {
			at = append(at, rapid.Float64Range(xs[0], xs[n-1]).Draw(t, "at"))
		}
		table += "```\n```schedule q\nx\n"
		for _, v := range at {
			table += fmt.Sprintf("%.17g\n", v)
		}
		s := compileText(block("y = interpolate(t.x, t.y, q.x)"), table)
		y := find(s, "y")
		if y == nil || y.Failed {
			t.Fatalf("not computed: %v", s.Diagnostics)
		}
		for i, v := range at {
			want := line.Predict(v)
			if got := y.Value.Num[i]; math.Abs(got-want) > 1e-9*math.Max(1, math.Abs(want)) {
				t.Errorf("at %g: got %g, want %g", v, got, want)
			}
		}
		beyond := compileText(block(fmt.Sprintf("y = interpolate(t.x, t.y, %.17g)", xs[n-1]+1)), table)
		if !has(beyond.Diagnostics, diag.OutOfRange, "") {
			t.Error("it extrapolates")
		}
	})
}

// has tells whether an error with an id says something.
func has(list []diag.Diagnostic, id, words string) bool {
	for _, d := range list {
		if d.Severity == diag.Error && d.ID == id && strings.Contains(d.Message, words) {
			return true
		}
	}
	return false
}

// Load combinations as a product of matrices: the factors of EN 1990 (6.10),
// common practice, times the effects of the single loads, for a frame's three
// members. The governing combination of each member is found there too.
func TestLoadCombinationsAgainstGonum(t *testing.T) {
	marks := []string{"LC1", "LC2", "LC3", "LC4"}
	factors := mat.NewDense(4, 3, []float64{ // permanent, imposed, wind
		1.35, 1.5, 0.9,
		1.35, 1.05, 1.5,
		1.0, 0, 1.5,
		1.35, 0, -1.5,
	})
	members := []string{"M1", "M2", "M3"}
	effects := mat.NewDense(3, 3, []float64{ // kN, by load and member
		-120, 45, -18,
		-80, 62, 25,
		30, -75, 64,
	})
	area := []float64{2000, 1500, 900} // mm²
	body := "```cases\ncase | g | q | w\n"
	for i, m := range marks {
		body += fmt.Sprintf("%s | %g | %g | %g\n", m, factors.At(i, 0), factors.At(i, 1), factors.At(i, 2))
	}
	body += "```\n```schedule m\nmark | G [kN] | Q [kN] | W [kN] | A [mm^2]\n"
	for j, m := range members {
		body += fmt.Sprintf("%s | %g | %g | %g | %g\n", m, effects.At(0, j), effects.At(1, j), effects.At(2, j), area[j])
	}
	body += "```\n" + block(`
N = g*m.G + q*m.Q + w*m.W
sigma [MPa] = N/m.A
N_d = extreme(N over cases)
check abs(sigma) <= 200 MPa
`)
	s := sound(t, body)
	var want mat.Dense
	want.Mul(factors, effects)
	N, sigma, extreme := find(s, "N"), find(s, "sigma"), find(s, "N_d")
	check := s.Steps[len(s.Steps)-1].Check
	worst, mark := 0.0, ""
	for e := range N.Value.Num {
		at := N.Value.Type.Mark(e)
		i, j := index(at, marks), index(at, members)
		if i < 0 || j < 0 {
			t.Fatalf("an entry is marked %q", at)
		}
		near(t, "N of "+at, N.Value.Num[e], 1000*want.At(i, j))
		stress := 1e9 * want.At(i, j) / area[j]
		near(t, "sigma of "+at, sigma.Value.Num[e], stress)
		near(t, "utilisation of "+at, check.Ratio[e], math.Abs(stress)/200e6)
		if u := math.Abs(stress) / 200e6; u > worst {
			worst, mark = u, at
		}
	}
	if got := check.Type.Mark(check.Governs); got != mark || sigma.Value.Type.Mark(sigma.Entry) != mark {
		t.Errorf("%s governs and sigma is printed for %s, want %s", got, sigma.Value.Type.Mark(sigma.Entry), mark)
	}
	for j := range members {
		largest := 0.0
		for i := range marks {
			if v := want.At(i, j); math.Abs(v) > math.Abs(largest) {
				largest = v
			}
		}
		near(t, "N_d of "+members[j], extreme.Value.Num[j], 1000*largest)
	}
}

// index finds which of the marks stands in the mark of an entry.
func index(entry string, marks []string) int {
	for i, m := range marks {
		if strings.Contains(entry, m) {
			return i
		}
	}
	return -1
}

func near(t *testing.T, what string, got, want float64) {
	t.Helper()
	if math.Abs(got-want) > 1e-9*math.Max(math.Abs(want), 1) {
		t.Errorf("%s is %.12g, want %.12g", what, got, want)
	}
}

// The CSV reader by RFC 4180, section 2, rule by rule, and what breaks them.
func TestCSVByRFC4180(t *testing.T) {
	for _, c := range []struct{ rule, csv, marks, x string }{
		{"1: records end with CRLF", "mark,x [mm]\r\nA,1\r\nB,2\r\n", "A|B", "1 mm | 2 mm"},
		{"1, as files have it: LF", "mark,x [mm]\nA,1\nB,2\n", "A|B", "1 mm | 2 mm"},
		{"2: the last record may lack its line break", "mark,x [mm]\r\nA,1\r\nB,2", "A|B", "1 mm | 2 mm"},
		{"3: a header in the first line", "x [mm],mark\r\n1,A\r\n", "A", "1 mm"},
		{"4: spaces are part of a field: within it they stay", "mark,x [mm]\r\nA 1,1\r\n", "A 1", "1 mm"},
		{"5: fields may be quoted", "\"mark\",\"x [mm]\"\r\n\"A\",\"1\"\r\n", "A", "1 mm"},
		{"6: commas in quotes", "mark,x [mm]\r\n\"A,1\",1\r\n", "A,1", "1 mm"},
		{"6: line breaks in quotes", "mark,x [mm]\r\n\"A\r\n1\",1\r\nB,2\r\n", "A\n1|B", "1 mm | 2 mm"},
		{"7: quotes in quotes are doubled", "mark,x [mm]\r\n\"A \"\"1\"\"\",1\r\n", "A \"1\"", "1 mm"},
		{"an empty field in quotes", "mark,x [mm]\r\n\"\",1\r\nB,2\r\n", "|B", "1 mm | 2 mm"},
	} {
		s := compile(t, "```schedule s from s.csv\n```\n", "s.csv", c.csv)
		x, mark := find(s, "s.x"), find(s, "s.mark")
		if x == nil || mark == nil || x.Failed || mark.Failed {
			t.Errorf("%s: %v", c.rule, s.Diagnostics)
			continue
		}
		if got := strings.Join(mark.Value.Text, "|"); got != c.marks || all(x) != c.x {
			t.Errorf("%s: got %q, %s; want %q, %s", c.rule, got, all(x), c.marks, c.x)
		}
	}
	for _, c := range []struct {
		fault, csv string
		line       int
		words      string
	}{
		{"4: as many fields in each line", "mark,x [mm]\r\nA,1\r\nB\r\n", 3, "the row has 1 field, but the header has 2"},
		{"5: a quote in a field without quotes", "mark,x [mm]\r\nA,1\r\nB\"2,2\r\n", 3, "a quote stands in a field"},
		{"7: a quote that is not doubled", "mark,x [mm]\r\n\"A\"1\",1\r\n", 2, "not doubled"},
		{"quotes that are not closed", "mark,x [mm]\r\nA,1\r\n\"B,2\r\n", 3, "not closed"},
	} {
		s := compile(t, "```schedule s from s.csv\n```\n", "s.csv", c.csv)
		found := false
		for _, d := range s.Diagnostics {
			if d.Severity == diag.Error && d.Source.Name == "s.csv" && strings.Contains(d.Message, c.words) {
				found = true
				if line, _ := d.Source.Position(d.Span.Start); line != c.line {
					t.Errorf("%s: reported at line %d, want %d", c.fault, line, c.line)
				}
			}
		}
		if !found {
			t.Errorf("%s: %v", c.fault, s.Diagnostics)
		}
	}
}

// Rows and pairs of rows are bounded, and the message names the bound.
func TestRowBounds(t *testing.T) {
	list := func(rows int) string {
		var b strings.Builder
		b.WriteString("mark,x [mm]\n")
		for i := range rows {
			fmt.Fprintf(&b, "R%d,%d\n", i, i)
		}
		return b.String()
	}
	for _, c := range []struct {
		what, body string
		files      []string
		want       string // "" for none
	}{
		{"100,000 rows", "```schedule a from a.csv\n```\n", []string{"a.csv", list(100_000)}, ""},
		{"one row more", "```schedule a from a.csv\n```\n", []string{"a.csv", list(100_001)}, "the bound is 100000"},
		{"10 million pairs and more", "```schedule a from a.csv\n```\n```schedule b from b.csv\n```\n" + block("y = a.x*b.x"),
			[]string{"a.csv", list(3163), "b.csv", list(3162)}, "over 10000000 pairs, the bound"},
		{"in a reduction too", "```schedule a from a.csv\n```\n```schedule b from b.csv\n```\n" + block("y = max(a.x + b.x over a)"),
			[]string{"a.csv", list(3163), "b.csv", list(3162)}, "over 10000000 pairs, the bound"},
	} {
		s := compile(t, c.body, c.files...)
		if got := has(s.Diagnostics, diag.BoundExceeded, c.want); got != (c.want != "") {
			t.Errorf("%s: %v", c.what, s.Diagnostics)
		}
	}
}
