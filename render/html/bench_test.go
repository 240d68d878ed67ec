package html_test

import (
	"fmt"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/html"
)

// long is a calc of about 50 pages: computed statements with prose between.
func long(statements int) []byte {
	var b strings.Builder
	b.WriteString("---\ncalc: C-600\ntitle: A long calc\nrev: A\n---\n\n# Members\n\n```calc\nP = 48 kN # Pull [load schedule]\nd = 25 mm # Diameter [drawing S-12]\nf_y = 355 MPa # Yield strength [EN 10025-2]\n```\n")
	for i := range statements / 6 {
		fmt.Fprintf(&b, "\n## Member %d\n\nThe pull on member %d is shared by *two* shear planes, and the plates are snug; the stress is {tau_%d} at most.\n\n```calc\n", i, i, i)
		fmt.Fprintf(&b, "A_%d = pi*d^2/4 # Area of one shear plane\n", i)
		fmt.Fprintf(&b, "tau_%d [MPa] = P/(2*A_%d) # Average shear stress\n", i, i)
		fmt.Fprintf(&b, "W_%d = pi*d^3/32 # Section modulus\n", i)
		fmt.Fprintf(&b, "M_%d [kN*m] = P/8*(25 mm + 4*2 mm + 2*15 mm) # Bending moment\n", i)
		fmt.Fprintf(&b, "sigma_%d = sqrt((M_%d/W_%d)^2 + 3*tau_%d^2) # Equivalent stress\n", i, i, i, i)
		fmt.Fprintf(&b, "check tau_%d <= 0.6*f_y # Shear [EN 1993-1-8, Table 3.10]\n```\n", i)
	}
	return []byte(b.String())
}

func compileText(b testing.TB, text []byte) *notebook.Sheet {
	b.Helper()
	c := &notebook.Context{FS: fstest.MapFS{"long.md": {Data: text}}, Panics: true}
	s := notebook.Compile(c, "long.md")
	if s.Failed() {
		b.Fatal(s.Diagnostics[0].Text())
	}
	return s
}

func BenchmarkPage(b *testing.B) {
	s := compileText(b, long(600))
	b.ReportAllocs()
	for b.Loop() {
		render.NewPage(s)
	}
}

func BenchmarkHTML(b *testing.B) {
	p := render.NewPage(compileText(b, long(600)))
	var dst []byte
	b.ReportAllocs()
	for b.Loop() {
		dst = html.Append(dst[:0], p)
	}
	b.SetBytes(int64(len(dst)))
}

func BenchmarkCompile(b *testing.B) {
	text := long(600)
	b.ReportAllocs()
	for b.Loop() {
		compileText(b, text)
	}
}
