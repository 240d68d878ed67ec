package syntax

import (
	"fmt"
	"strings"
	"testing"
	"time"

	"gusset/notebook/diag"
)

// calcLines is a page of a calc as engineers write them, repeated.
func calcLines(n int) string {
	lines := []string{
		"P     = 48 kN          # Pull on one lug, factored [load schedule, row 7]",
		"tau [MPa] = P/(2*A)  # Average shear stress",
		"sigma_b = P/(d*t)",
		"tau_d = f_y/(sqrt(3)*gamma_M0)   # Design shear strength [EN 1993-1-1, 6.2.6]",
		"check tau <= tau_d   # Pin in double shear",
	}
	var b strings.Builder
	for i := range n {
		b.WriteString(lines[i%len(lines)])
		b.WriteByte('\n')
	}
	return b.String()
}

// fenced returns a source that is one fence, and how to parse it.
func fenced(info, content string) (*diag.Source, func() (*Block, []diag.Diagnostic)) {
	head := "```" + info + "\n"
	src := diag.NewSource("calc.md", []byte(head+content))
	return src, func() (*Block, []diag.Diagnostic) {
		return NewReader(src, len(src.Text)).Block(diag.Span{Start: 3, End: len(head) - 1}, diag.Span{Start: 0, End: len(src.Text)}, linesOf(src.Text, len(head)))
	}
}

// linesOf splits a fence's content into lines.
func linesOf(text []byte, start int) []Line {
	var lines []Line
	for start < len(text) {
		end := start
		for end < len(text) && text[end] != '\n' {
			end++
		}
		lines = append(lines, Line{start, end})
		start = end + 1
	}
	return lines
}

// BenchmarkLine parses a line of a calc, and in turns a bare parser reads the
// same; ratio is the one over the other.
func BenchmarkLine(b *testing.B) {
	const n, line = 1000, "tau [MPa] = P/(2*A)  # Average shear stress"
	src, parse := fenced("calc", strings.Repeat(line+"\n", n))
	if _, diags := parse(); len(diags) > 0 {
		b.Fatal(diags[0].Text())
	}
	lines := linesOf(src.Text, 8)
	var own, bare time.Duration
	for b.Loop() {
		t := time.Now()
		NewReader(src, len(src.Text)).Block(diag.Span{Start: 3, End: 7}, diag.Span{Start: 0, End: len(src.Text)}, lines)
		own += time.Since(t)
		t = time.Now()
		for range n {
			bareSink = bareLine(line)
		}
		bare += time.Since(t)
	}
	b.ReportMetric(float64(own.Nanoseconds())/float64(b.N)/n, "ns/line")
	b.ReportMetric(float64(bare.Nanoseconds())/float64(b.N)/n, "ns/bare")
	b.ReportMetric(float64(own)/float64(bare), "ratio")
}

func BenchmarkCalc(b *testing.B) {
	for _, n := range []int{10, 600, 6000, 50_000} {
		b.Run(fmt.Sprint(n), func(b *testing.B) { benchmarkStatements(b, calcLines(n), n) })
	}
}

func benchmarkStatements(b *testing.B, content string, n int) {
	src, _ := fenced("calc", content)
	lines := linesOf(src.Text, 8)
	b.ReportAllocs()
	for b.Loop() {
		if _, diags := NewReader(src, len(src.Text)).Block(diag.Span{Start: 3, End: 7}, diag.Span{Start: 0, End: len(src.Text)}, lines); len(diags) > 0 {
			b.Fatal(diags[0].Text())
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(n), "ns/stmt")
}

func BenchmarkNesting(b *testing.B) {
	for _, n := range []int{5_000, 50_000} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			_, parse := fenced("calc", "x = "+strings.Repeat("(", n)+"1"+strings.Repeat(")", n)+"\n")
			for b.Loop() {
				parse()
			}
		})
	}
}

func BenchmarkTable(b *testing.B) {
	const rows = 1000
	_, parse := fenced("schedule bolts", "mark | x [mm] | y [mm]\n"+strings.Repeat("B1   |    -70 |   75.5\n", rows))
	b.ReportAllocs()
	for b.Loop() {
		if _, diags := parse(); len(diags) > 0 {
			b.Fatal(diags[0].Text())
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/rows/3, "ns/cell")
}

// bareNode and bareParser are the floor: a hand-written parser of the same
// line that knows nothing of places, notes, units or mistakes.
type bareNode struct {
	op   byte
	name string
	x, y *bareNode
}

type bareParser struct {
	s string
	i int
}

func (p *bareParser) blanks() {
	for p.i < len(p.s) && p.s[p.i] == ' ' {
		p.i++
	}
}

func (p *bareParser) binary(ops string, next func() *bareNode) *bareNode {
	x := next()
	for p.blanks(); p.i < len(p.s) && strings.IndexByte(ops, p.s[p.i]) >= 0; p.blanks() {
		op := p.s[p.i]
		p.i++
		x = &bareNode{op: op, x: x, y: next()}
	}
	return x
}

func (p *bareParser) sum() *bareNode     { return p.binary("+-", p.product) }
func (p *bareParser) product() *bareNode { return p.binary("*/", p.primary) }

func (p *bareParser) primary() *bareNode {
	p.blanks()
	if p.s[p.i] == '(' {
		p.i++
		x := p.sum()
		p.i++
		return x
	}
	start := p.i
	for p.i < len(p.s) && byteClass[p.s[p.i]]&nameByte != 0 {
		p.i++
	}
	return &bareNode{name: p.s[start:p.i]}
}

var bareSink *bareNode

func bareLine(line string) *bareNode {
	p := bareParser{s: line}
	name := p.primary()
	p.blanks()
	end := strings.IndexByte(p.s[p.i:], ']')
	unit := p.s[p.i+1 : p.i+end]
	p.i += end + 1
	p.blanks()
	p.i++
	return &bareNode{op: '=', name: name.name + unit, x: p.sum()}
}
