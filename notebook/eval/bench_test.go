package eval_test

import (
	"fmt"
	"math"
	"strings"
	"testing"
	"testing/fstest"
	"time"

	"gusset/notebook"
	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
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

// beside measures compiling a calc and in turns the same arithmetic written by
// hand in Go, and prints both for an entry and statement, and their ratio. What
// compiling takes includes reading the files, checking and the steps; eval is
// the same less what a calc of the same statements over two rows takes.
func beside(b *testing.B, whole, small fstest.MapFS, entries int, hand func()) {
	b.Helper()
	compiled := func(root fstest.MapFS) time.Duration {
		start := time.Now()
		if s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md"); s.Failed() {
			b.Fatal(s.Diagnostics[0].Text())
		}
		return time.Since(start)
	}
	var all, fixed, byHand time.Duration
	b.ReportAllocs()
	for b.Loop() {
		all += compiled(whole)
		fixed += compiled(small)
		start := time.Now()
		hand()
		byHand += time.Since(start)
	}
	n := float64(b.N) * float64(entries)
	b.ReportMetric(float64(all.Nanoseconds())/n, "ns/entry/statement")
	b.ReportMetric(float64(byHand.Nanoseconds())/n, "by-hand-ns/entry/statement")
	b.ReportMetric(float64(all)/float64(byHand), "x-by-hand")
	b.ReportMetric(float64(all-fixed)/float64(byHand), "x-by-hand-less-fixed")
}

func calcFile(body string, more ...string) fstest.MapFS {
	root := fstest.MapFS{"calc.md": &fstest.MapFile{Data: []byte(front + body)}}
	for i := 0; i+1 < len(more); i += 2 {
		root[more[i]] = &fstest.MapFile{Data: []byte(more[i+1])}
	}
	return root
}

// program checks the fences of a text, without prose and front matter.
func program(b *testing.B, text string) *check.Program {
	src := diag.NewSource("calc.md", []byte(text))
	in := &check.Input{Source: src}
	for at := 0; ; {
		open := strings.Index(text[at:], "```")
		if open < 0 {
			break
		}
		open += at
		end := open + 3 + strings.Index(text[open+3:], "```")
		info := diag.Span{Start: open + 3, End: open + strings.IndexByte(text[open:], '\n')}
		var lines []syntax.Line
		for p := info.End + 1; p < end; {
			n := p + strings.IndexByte(text[p:], '\n')
			lines = append(lines, syntax.Line{Start: p, End: n})
			p = n + 1
		}
		block, faults := syntax.NewReader(src, len(src.Text)).Block(info, diag.Span{Start: open, End: end + 3}, lines)
		if len(faults) > 0 {
			b.Fatal(faults[0].Text())
		}
		in.Blocks = append(in.Blocks, block)
		at = end + 3
	}
	p := check.Check(in)
	if diag.HasErrors(p.Diagnostics) {
		b.Fatal(p.Diagnostics[0].Text())
	}
	return p
}

// BenchmarkCasesAndBolts computes 40 statements over 200 load cases × 24 bolts,
// and in turns the same arithmetic written in Go. What it computes beside the
// entries (which one governs, what is printed of it) is part of its time.
func BenchmarkCasesAndBolts(b *testing.B) {
	p := program(b, manyRows(200, 24))
	eval.Run(p, nil)
	var ours, hand time.Duration
	b.ReportAllocs()
	for b.Loop() {
		t := time.Now()
		eval.Run(p, nil)
		ours += time.Since(t)
		t = time.Now()
		casesAndBoltsByHand()
		hand += time.Since(t)
	}
	n := float64(b.N) * 200 * 24 * 40
	b.ReportMetric(float64(ours.Nanoseconds())/n, "ns/entry/statement")
	b.ReportMetric(float64(hand.Nanoseconds())/n, "by-hand-ns")
	b.ReportMetric(float64(ours)/float64(hand), "times-by-hand")
}

func casesAndBoltsByHand() {
	const cases, bolts = 200, 24
	x, y := make([]float64, bolts), make([]float64, bolts)
	v, m := make([]float64, cases), make([]float64, cases)
	for i := range x {
		x[i], y[i] = float64(i*10-100)/1000, float64(i*7-50)/1000
	}
	for i := range v {
		v[i], m[i] = float64(i+1)*1000, float64(i%7+1)*1000
	}
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

// BenchmarkPlot sweeps 200 points through 40 statements.
func BenchmarkPlot(b *testing.B) {
	var t strings.Builder
	t.WriteString("```calc\nd = 20 mm\nx_0 = d\n")
	for i := 1; i <= 40; i++ {
		fmt.Fprintf(&t, "x_%d = x_%d*1.01 + d/3 - sqrt(d*x_%d)/10\n", i, i-1, i-1)
	}
	t.WriteString("```\n```plot\nx_40 against d from 10 mm to 40 mm\n")
	const points = 201
	beside(b, calcFile(t.String()+"```\n"), calcFile(t.String()+"steps 1\n```\n"), points*40, func() {
		d, x := make([]float64, points), make([]float64, points)
		for i := range d {
			d[i] = 0.010 + 0.030*float64(i)/(points-1)
		}
		copy(x, d)
		for range 40 {
			next := make([]float64, points)
			for i := range next {
				next[i] = x[i]*1.01 + d[i]/3 - math.Sqrt(d[i]*x[i])/10
			}
			x = next
		}
		sink = x[points-1]
	})
}

// BenchmarkLongTable computes 10 columns over 100,000 rows.
func BenchmarkLongTable(b *testing.B) {
	var t strings.Builder
	t.WriteString("```schedule m\nmark | N [kN] | b [mm]\n")
	for i := 0; i < 100_000; i++ {
		fmt.Fprintf(&t, "M%d | %d | %d\n", i, i%500+1, i%90+10)
	}
	t.WriteString("```\n```calc\ns_0 = m.N/(m.b*10 mm)\n")
	for i := 1; i < 10; i++ {
		fmt.Fprintf(&t, "s_%d = s_%d*1.1 + 2*s_0 - s_%d/3\n", i, i-1, i-1)
	}
	t.WriteString("```\n")
	p := program(b, t.String())
	eval.Run(p, nil)
	force, width := make([]float64, 100_000), make([]float64, 100_000)
	for i := range force {
		force[i], width[i] = float64(i%500+1)*1000, float64(i%90+10)/1000
	}
	var ours, hand time.Duration
	b.ReportAllocs()
	for b.Loop() {
		start := time.Now()
		eval.Run(p, nil)
		ours += time.Since(start)
		start = time.Now()
		first := make([]float64, len(force))
		for i := range first {
			first[i] = force[i] / (width[i] * 0.01)
		}
		last := first
		for k := 1; k < 10; k++ {
			next := make([]float64, len(first))
			for i := range next {
				next[i] = last[i]*1.1 + 2*first[i] - last[i]/3
			}
			last = next
		}
		sink = last[0]
		hand += time.Since(start)
	}
	n := float64(b.N) * 100_000 * 10
	b.ReportMetric(float64(ours.Nanoseconds())/n, "ns/entry/statement")
	b.ReportMetric(float64(ours)/float64(hand), "times-by-hand")
}
