package notebook

import (
	"fmt"
	"io"
	"strings"
	"testing"
	"time"

	"github.com/yuin/goldmark"
	"github.com/yuin/goldmark/extension"
	"github.com/yuin/goldmark/parser"
)

// longCalc is a calc of about 50 pages: a section of prose for every ten
// statements, some 150 bytes each.
func longCalc(statements int) string {
	var b strings.Builder
	b.WriteString("---\ncalc: C-1\ntitle: A long calc\nunits: [kN, mm, MPa]\n---\n\n```calc\nP = 48 kN   # Pull [load schedule]\nd = 25 mm   # Pin diameter [drawing S-12]\n```\n")
	for i := 0; i < statements; i += 10 {
		fmt.Fprintf(&b, "\n## Part %d\n\nThe pull is shared by *two* planes of the pin, and the plates are snug, so that its bending is taken up\n"+
			"in another section. With {A_%d} for one plane the stress comes to {tau_%d}, see [the sketch](#part-0).\n\n", i/10, i, i)
		b.WriteString("| part | material |\n|---|---|\n| pin | 42CrMo4 |\n| plates | S355 |\n\n```calc\n")
		for j := i; j < i+10 && j < statements; j += 5 {
			fmt.Fprintf(&b, "A_%d         = pi*d^2/4                # Area of one shear plane [geometry]\n", j)
			fmt.Fprintf(&b, "tau_%d [MPa] = P/(2*A_%d)              # Average shear stress, two planes\n", j, j)
			fmt.Fprintf(&b, "k_%d         = 0.85 if tau_%d <= 40 MPa # Factor by stress [EN 1993-1-8, 3.13]\n             = 0.65 otherwise\n", j, j)
			fmt.Fprintf(&b, "f_%d         = sqrt(tau_%d^2 + (3 MPa)^2)*k_%d  # Combined\n", j, j, j)
			fmt.Fprintf(&b, "check f_%d <= 355 MPa/1.5               # Pin\n", j)
		}
		b.WriteString("```\n")
	}
	return b.String()
}

// BenchmarkCompile compiles the calc of 50 pages, and for scale renders the
// same bytes as plain Markdown with tables and heading ids.
func BenchmarkCompile(b *testing.B) {
	text := longCalc(600)
	root := files("a.md", text)
	if s := compile(root, "a.md"); s.Failed() {
		b.Fatal(errorsOf(s))
	}
	plain := goldmark.New(goldmark.WithExtensions(extension.Table), goldmark.WithParserOptions(parser.WithAutoHeadingID()))
	b.SetBytes(int64(len(text)))
	b.ReportAllocs()
	var ours, theirs time.Duration
	for b.Loop() {
		start := time.Now()
		compile(root, "a.md")
		middle := time.Now()
		if err := plain.Convert([]byte(text), io.Discard); err != nil {
			b.Fatal(err)
		}
		ours += middle.Sub(start)
		theirs += time.Since(middle)
	}
	b.ReportMetric(float64(ours.Microseconds())/float64(b.N)/1000, "ms/compile")
	b.ReportMetric(float64(ours)/float64(theirs), "x-goldmark")
}

// BenchmarkGrowth compiles a calc of ten times the statements: at most eleven
// times the time.
func BenchmarkGrowth(b *testing.B) {
	short, long := files("a.md", longCalc(600)), files("a.md", longCalc(6000))
	var one, ten time.Duration
	for b.Loop() {
		start := time.Now()
		compile(short, "a.md")
		middle := time.Now()
		compile(long, "a.md")
		one += middle.Sub(start)
		ten += time.Since(middle)
	}
	b.ReportMetric(float64(ten)/float64(one), "x-for-10x")
}
