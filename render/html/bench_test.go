package html_test

import (
	"fmt"
	"io"
	"runtime/debug"
	"testing"
	"testing/fstest"
	"time"

	"github.com/yuin/goldmark"
	"github.com/yuin/goldmark/extension"
	"github.com/yuin/goldmark/parser"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/html"
	"gusset/testdata/longcalc"
)

// compileBytes compiles a calc that stands alone and has no errors.
func compileBytes(t testing.TB, text []byte) *notebook.Sheet {
	t.Helper()
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: text}}
	s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
	if s.Failed() {
		t.Fatal(s.Diagnostics[0].Text())
	}
	return s
}

// BenchmarkLongCalc compiles the file, compiles it to HTML, and lets
// goldmark with tables and heading ids render the same bytes, in turns, and
// prints how many times goldmark each takes.
func BenchmarkLongCalc(b *testing.B) {
	text := longcalc.Text(40, 84)
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

// BenchmarkTenTimes compiles forty sections and four hundred in turns: linear
// growth is a ratio of 10. With the usual room for the heap the larger has to
// fetch most of its memory from the machine; with more room it does not.
func BenchmarkTenTimes(b *testing.B) {
	for _, percent := range []int{100, 400} {
		b.Run(fmt.Sprint("gc-", percent), func(b *testing.B) {
			defer debug.SetGCPercent(debug.SetGCPercent(percent))
			small, large := longcalc.Text(40, 84), longcalc.Text(400, 84)
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
		})
	}
}

// BenchmarkPage decides what the file prints, and BenchmarkHTML writes it.
func BenchmarkPage(b *testing.B) {
	s := compileBytes(b, longcalc.Text(40, 84))
	b.ReportAllocs()
	for b.Loop() {
		render.NewPage(s)
	}
}

func BenchmarkHTML(b *testing.B) {
	p := render.NewPage(compileBytes(b, longcalc.Text(40, 84)))
	var dst []byte
	b.ReportAllocs()
	for b.Loop() {
		dst = html.Append(dst[:0], p)
	}
	b.SetBytes(int64(len(dst)))
}
