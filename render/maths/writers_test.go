package maths

import (
	"flag"
	"os"
	"strings"
	"testing"
)

var update = flag.Bool("update", false, "write the golden files anew")

// columnEms is the width of the tests' page, in ems.
const columnEms = 27

func TestPlain(t *testing.T) {
	for _, c := range writerCases {
		if got := string(AppendPlainChain(nil, c.chain)); got != c.plain {
			t.Errorf("%s: got %s, want %s", c.name, got, c.plain)
		}
	}
}

func golden(t *testing.T, file, got string) {
	t.Helper()
	if *update {
		if err := os.WriteFile(file, []byte(got), 0o666); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	if got == string(want) {
		return
	}
	g, w := strings.Split(got, "\n"), strings.Split(string(want), "\n")
	for i := range g {
		if i >= len(w) || g[i] != w[i] {
			t.Fatalf("%s line %d:\n got %s\nwant %s", file, i+1, g[i], append(w, "")[min(i, len(w))])
		}
	}
	t.Fatalf("%s: got %d lines, want %d", file, len(g), len(w))
}

func TestMathMLGolden(t *testing.T) {
	var b []byte
	for _, c := range writerCases {
		b = append(b, c.name...)
		b = append(b, '\n')
		b = AppendChain(b, c.chain, columnEms)
		b = append(b, '\n')
	}
	b = append(b, "inline\n"...)
	b = AppendMathML(b, Row{sym("τ"), Relation("="), num("48.89", mPa)})
	golden(t, "testdata/mathml.golden", string(b)+"\n")
}

// A text of many words is prose to a browser, which breaks no line in a formula.
func TestLongTextWrapsInMathML(t *testing.T) {
	words := "plates from the northern stock"
	value := Text{Text: words, Ref: Ref{Target: "grade"}}
	html := string(AppendChain(nil, Chain{Left: sym("grade"), Steps: []Step{eq(value)}}, columnEms))
	want := `<span class="w"><math displaystyle="true"><mo form="infix">=</mo></math> <a href="#grade">` + words + "</a></span>"
	if !strings.Contains(html, want) {
		t.Errorf("got %s\nwant %s", html, want)
	}
}

// Two right sides have a line each where they surely do not fit side by side.
func TestRightSidesStack(t *testing.T) {
	for _, c := range []struct {
		columns float64
		stacked bool
	}{{columnEms, false}, {8, true}} {
		if html := string(AppendChain(nil, shear, c.columns)); strings.Contains(html, `class="chain two"`) != c.stacked {
			t.Errorf("%g ems: %s", c.columns, html)
		}
	}
}

func BenchmarkMathML(b *testing.B) {
	b.ReportAllocs()
	var dst []byte
	for b.Loop() {
		dst = AppendChain(dst[:0], shear, columnEms)
	}
}

func BenchmarkPlain(b *testing.B) {
	b.ReportAllocs()
	var dst []byte
	for b.Loop() {
		dst = AppendPlainChain(dst[:0], shear)
	}
}
