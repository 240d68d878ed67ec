package eval_test

import (
	"fmt"
	"math"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
)

// sink keeps the compiler from dropping a benchmark's work.
var sink float64

// manyRows is a calc of 40 statements over cases × bolts.
func manyRows(cases, bolts int) string {
	var b strings.Builder
	b.WriteString("```schedule bolts\nmark | x [mm] | y [mm]\n")
	for i := 0; i < bolts; i++ {
		fmt.Fprintf(&b, "B%d | %d | %d\n", i, i*10-100, i*7-50)
	}
	b.WriteString("```\n```cases\ncase | V [kN] | M [kN*m]\n")
	for i := 0; i < cases; i++ {
		fmt.Fprintf(&b, "LC%d | %d | %d\n", i, i+1, i%7+1)
	}
	b.WriteString("```\n```calc\nI_p = sum(bolts.x^2 + bolts.y^2)\n")
	for i := 0; i < 10; i++ {
		fmt.Fprintf(&b, "F_x_%d = -M*bolts.y/I_p\nF_y_%d = V/24 + M*bolts.x/I_p\nF_%d = hypot(F_x_%d, F_y_%d)\nu_%d = F_%d/(100 kN)\n", i, i, i, i, i, i, i)
	}
	b.WriteString("```\n")
	return b.String()
}

// BenchmarkCasesAndBolts computes 40 statements over 200 load cases × 24 bolts.
func BenchmarkCasesAndBolts(b *testing.B) {
	text := front + manyRows(200, 24)
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: []byte(text)}}
	b.ReportAllocs()
	for b.Loop() {
		s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
		if s.Failed() {
			b.Fatal(s.Diagnostics[0].Text())
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/(200*24*40), "ns/entry/statement")
}

// BenchmarkCasesAndBoltsByHand is the same arithmetic written in Go.
func BenchmarkCasesAndBoltsByHand(b *testing.B) {
	const cases, bolts = 200, 24
	x, y := make([]float64, bolts), make([]float64, bolts)
	v, m := make([]float64, cases), make([]float64, cases)
	for i := range x {
		x[i], y[i] = float64(i*10-100)/1000, float64(i*7-50)/1000
	}
	for i := range v {
		v[i], m[i] = float64(i+1)*1000, float64(i%7+1)*1000
	}
	for b.Loop() {
		ip := 0.0
		for i := range x {
			ip += x[i]*x[i] + y[i]*y[i]
		}
		for k := 0; k < 10; k++ {
			fx, fy := make([]float64, cases*bolts), make([]float64, cases*bolts)
			f, u := make([]float64, cases*bolts), make([]float64, cases*bolts)
			for i := range x {
				for c := range v {
					fx[i*cases+c] = -m[c] * y[i] / ip
				}
			}
			for i := range x {
				for c := range v {
					fy[i*cases+c] = v[c]/24 + m[c]*x[i]/ip
				}
			}
			for i := range f {
				f[i] = math.Hypot(fx[i], fy[i])
			}
			for i := range u {
				u[i] = f[i] / 1e5
			}
			sink = u[len(u)-1]
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/(200*24*40), "ns/entry/statement")
}

// BenchmarkPlot sweeps 200 points through 40 statements.
func BenchmarkPlot(b *testing.B) {
	var t strings.Builder
	t.WriteString(front + "```calc\nd = 20 mm\nx_0 = d\n")
	for i := 1; i <= 40; i++ {
		fmt.Fprintf(&t, "x_%d = x_%d*1.01 + d/3 - sqrt(d*x_%d)/10\n", i, i-1, i-1)
	}
	t.WriteString("```\n```plot\nx_40 against d from 10 mm to 40 mm\n```\n")
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: []byte(t.String())}}
	for b.Loop() {
		if s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md"); s.Failed() {
			b.Fatal(s.Diagnostics[0].Text())
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/(200*40), "ns/point/statement")
}

// BenchmarkLongTable computes 10 columns over 100,000 rows from a CSV file.
func BenchmarkLongTable(b *testing.B) {
	var csv, t strings.Builder
	csv.WriteString("mark,N [kN],b [mm]\n")
	for i := 0; i < 100_000; i++ {
		fmt.Fprintf(&csv, "M%d,%d,%d\n", i, i%500+1, i%90+10)
	}
	t.WriteString(front + "```schedule m from m.csv\n```\n```calc\ns_0 = m.N/(m.b*10 mm)\n")
	for i := 1; i < 10; i++ {
		fmt.Fprintf(&t, "s_%d = s_%d*1.1 + 2*s_0 - s_%d/3\n", i, i-1, i-1)
	}
	t.WriteString("```\n")
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: []byte(t.String())}, "m.csv": &fstest.MapFile{Data: []byte(csv.String())}}
	b.ReportAllocs()
	for b.Loop() {
		if s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md"); s.Failed() {
			b.Fatal(s.Diagnostics[0].Text())
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/(100_000*10), "ns/entry/statement")
}
