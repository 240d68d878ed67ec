package eval_test

import (
	"fmt"
	"strings"
	"testing"
)

// What a statement keeps of reductions and columns for its further entries is
// never handed to another call, candidate or run of a helper. The values are
// worked out by hand.
func TestKeptReductions(t *testing.T) {
	s := sound(t, "```schedule s\nmark | x [mm] | k | g\nA | 1 | 1 | S1\nB | 2 | 2 | S2\nC | 3 | 1 | S1\n```\n"+
		"```schedule steels\nmark | f [mm]\nS1 | 10\nS2 | 20\n```\n"+
		"```cases\ncase | c [mm] | n\nL1 | 5 | 1\nL2 | 11 | 2\nL3 | 17 | 3\n```\n"+
		"```helper spread  # Widest spacing\nx [column of length]\nf = 1\nlimit [length]\nneeds f*max(x*1) <= limit\nm [length] = f*max(x*1) - min(x*1)\ngives m\n```\n"+
		block(`
w(a) = max(a*s.k over s)
two = w(s.x) + w(2*s.x)
rows = s.x + w(s.x) + w(n*s.x)
t = first of 1, 2, 3 with sum(t*s.x) >= 15 mm
u = first of 1, 2, 3 with sum(u*s.x over s) >= c
h = spread(s.x*2, n, 100 mm) + spread(s.x, 1, 100 mm)
v = interpolate(s.x*2, s.k*10, s.x + 1 mm)
f_t(m) = steels.f at m
looked = f_t(s.g)*n + f_t("S2")
f_m(m, a) = steels.f at m if a > 1 mm
          = max(a*s.k) + 0 mm otherwise
mixed = f_m(s.g, s.x)
share(q) = q/max(q*1)
shares = share(s.x)
fits = first of 1, 2, 3 with fits*s.x >= max(s.k*1 mm)
both = c + max(c*n) + min(c*n)
check s.x <= max(s.x*s.k)/2 + min(s.x*s.k)
`))
	for _, want := range []struct{ id, text string }{
		{"two", "12.00 mm"},
		{"rows", "9.000 mm | 13.00 mm | 17.00 mm | 10.00 mm | 14.00 mm | 18.00 mm | 11.00 mm | 15.00 mm | 19.00 mm"},
		{"t", "3.000"},
		{"u", "1.000 | 2.000 | 3.000"},
		{"h", "6.000 mm | 12.00 mm | 18.00 mm"},
		{"v", "10.00 | 15.00 | 20.00"},
		{"looked", "30.00 mm | 40.00 mm | 50.00 mm | 40.00 mm | 60.00 mm | 80.00 mm | 30.00 mm | 40.00 mm | 50.00 mm"},
		{"mixed", "4.000 mm | 20.00 mm | 10.00 mm"},
		{"fits", "2.000 | 1.000 | 1.000"},
		{"shares", "0.3333 | 0.6667 | 1.000"},
		{"both", "61.00 mm | 67.00 mm | 73.00 mm"},
	} {
		if got := all(find(s, want.id)); got != want.text {
			t.Errorf("%s: %s, want %s", want.id, got, want.text)
		}
	}
	for _, step := range s.Steps {
		if step.Check != nil && (!step.Check.AllOK || fmt.Sprint(step.Check.Ratio) != "[0.3333333333333333 0.6666666666666666 1]") {
			t.Error(step.Check.AllOK, step.Check.Ratio)
		}
	}
}

// BenchmarkCheckOfReduction grows with the rows, not with their square.
func BenchmarkCheckOfReduction(b *testing.B) {
	for _, rows := range []int{1000, 10_000} {
		var text strings.Builder
		text.WriteString("```schedule s\nmark | x [mm] | k\n")
		for i := range rows {
			fmt.Fprintf(&text, "A%d | %d | %d\n", i, i+1, i%7+1)
		}
		text.WriteString("```\n" + block("check s.x <= 2*max(s.x*s.k)"))
		b.Run(fmt.Sprint(rows), func(b *testing.B) {
			for b.Loop() {
				sound(b, text.String())
			}
		})
	}
}
