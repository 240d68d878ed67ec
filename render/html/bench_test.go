package html_test

import (
	"fmt"
	"io"
	"strings"
	"testing"
	"testing/fstest"
	"time"

	"github.com/yuin/goldmark"
	"github.com/yuin/goldmark/extension"
	"github.com/yuin/goldmark/parser"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/html"
)

// fiftyPages is a calc file of about fifty printed pages and 90 kB: 600
// computed statements among givens, checks and prose.
func fiftyPages(statements int) []byte {
	var b strings.Builder
	b.WriteString("---\ncalc: C-500\ntitle: A long calculation\nrev: A\nunits: [kN, mm, MPa, kN*m]\n---\n")
	for j := 0; j < statements/10; j++ {
		fmt.Fprintf(&b, "\n# Joint %d\n\nThe pull is shared by two shear planes. The plates are *snug*, so bending of the pin is taken up in the\n"+
			"next section with no gap, and `friction` between the plates is left out. At the design pull the stress is\n{tau_%[2]d}, "+
			"which the **pin** carries with ease; the plates are thicker than the drawing asks, for the sake of the\nweld, and the edge distances follow the drawing.\n\n", j+1, j)
		fmt.Fprintf(&b, "- the load comes from the schedule, row %d\n- the plates are of one grade\n\n```calc\n", j+1)
		fmt.Fprintf(&b, "P_%[1]d = %[2]d kN       # Pull on one lug, factored [load schedule, row %[1]d]\nd_%[1]d = 25 mm       # Pin diameter [drawing S-12 rev C]\n"+
			"t_%[1]d = 12 mm       # Inner plate [drawing S-12 rev C]\nf_%[1]d = 355 MPa     # Yield strength [EN 10025-2, Table 7]\n\n", j, 40+j%9)
		fmt.Fprintf(&b, "A_%[1]d = pi*d_%[1]d^2/4   # Area of one shear plane\ntau_%[1]d [MPa] = P_%[1]d/(2*A_%[1]d)   # Average shear stress, two planes\n"+
			"tau_d_%[1]d = f_%[1]d/(sqrt(3)*1.5)   # Design shear strength [von Mises]\ncheck tau_%[1]d <= tau_d_%[1]d   # Pin in double shear\n"+
			"sigma_b_%[1]d = P_%[1]d/(d_%[1]d*t_%[1]d)   # Bearing on the inner plate\ncheck sigma_b_%[1]d <= 0.9*f_%[1]d   # Bearing [basis of design 4.3]\n"+
			"M_%[1]d = P_%[1]d*(2*t_%[1]d + d_%[1]d)/8   # Bending of the pin\nW_%[1]d = pi*d_%[1]d^3/32   # Section modulus\n"+
			"sigma_m_%[1]d = M_%[1]d/W_%[1]d   # Bending stress\nu_%[1]d = (sigma_m_%[1]d/f_%[1]d)^2 + (tau_%[1]d/tau_d_%[1]d)^2   # Together\n```\n", j)
	}
	return []byte(b.String())
}

func compileBytes(b *testing.B, text []byte) *notebook.Sheet {
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: text}}
	s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
	if s.Failed() {
		b.Fatal(s.Diagnostics[0].Text())
	}
	return s
}

// BenchmarkFiftyPages compiles the file, compiles it to HTML, and lets
// goldmark with tables and heading ids render the same bytes, in turns, and
// prints how many times goldmark each takes.
func BenchmarkFiftyPages(b *testing.B) {
	text := fiftyPages(600)
	md := goldmark.New(goldmark.WithExtensions(extension.Table), goldmark.WithParserOptions(parser.WithAutoHeadingID()))
	var gold, compile, both time.Duration
	var dst []byte
	b.SetBytes(int64(len(text)))
	for b.Loop() {
		t := time.Now()
		if err := md.Convert(text, io.Discard); err != nil {
			b.Fatal(err)
		}
		gold += time.Since(t)
		t = time.Now()
		s := compileBytes(b, text)
		compile += time.Since(t)
		dst = html.Append(dst[:0], render.NewPage(s))
		both += time.Since(t)
	}
	n := float64(b.N)
	b.ReportMetric(gold.Seconds()*1e3/n, "goldmark-ms")
	b.ReportMetric(float64(compile)/float64(gold), "compile/goldmark")
	b.ReportMetric(float64(both)/float64(gold), "page/goldmark")
}

// BenchmarkTenTimes compiles 600 statements and 6,000 in turns: linear growth
// is a ratio of 10.
func BenchmarkTenTimes(b *testing.B) {
	small, large := fiftyPages(600), fiftyPages(6000)
	var one, ten time.Duration
	for b.Loop() {
		t := time.Now()
		html.Append(nil, render.NewPage(compileBytes(b, small)))
		one += time.Since(t)
		t = time.Now()
		html.Append(nil, render.NewPage(compileBytes(b, large)))
		ten += time.Since(t)
	}
	b.ReportMetric(float64(ten)/float64(one), "ratio")
}

// BenchmarkPage decides what the file prints, and BenchmarkHTML writes it.
func BenchmarkPage(b *testing.B) {
	s := compileBytes(b, fiftyPages(600))
	b.ReportAllocs()
	for b.Loop() {
		render.NewPage(s)
	}
}

func BenchmarkHTML(b *testing.B) {
	p := render.NewPage(compileBytes(b, fiftyPages(600)))
	var dst []byte
	b.ReportAllocs()
	for b.Loop() {
		dst = html.Append(dst[:0], p)
	}
	b.SetBytes(int64(len(dst)))
}
