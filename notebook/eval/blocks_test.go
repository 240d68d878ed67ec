package eval_test

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// Columns longer than the block they are worked on in, over two sets of rows of
// lengths that no block divides, have in each entry what plain Go makes of it;
// and the columns they are made from are left as they were.
func TestManyBlocks(t *testing.T) {
	const n, m = 271, 97
	var b strings.Builder
	b.WriteString("```schedule p\nmark | a\n")
	for i := 0; i < n; i++ {
		fmt.Fprintf(&b, "P%d | %d\n", i, i+1)
	}
	b.WriteString("```\n```schedule q\nmark | c\n")
	for i := 0; i < m; i++ {
		fmt.Fprintf(&b, "Q%d | %d\n", i, 2*i-50)
	}
	b.WriteString("```\n" + block(`
one  = p.a*2 + 1
two  = p.a*q.c - q.c/(p.a + 1)
back = two + one*q.c
pick = q.c if p.a > 100
     = back otherwise
most = max(back over q)
all  = sum(pick)
`))
	s := sound(t, b.String())
	total := 0.0
	near := func(got, want float64) bool { return math.Abs(got-want) <= 1e-12*math.Max(1, math.Abs(want)) }
	for i := 0; i < n; i++ {
		a := float64(i + 1)
		largest := math.Inf(-1)
		for k := 0; k < m; k++ {
			c := float64(2*k - 50)
			two := a*c - c/(a+1)
			back := two + (a*2+1)*c
			pick := back
			if a > 100 {
				pick = c
			}
			total += pick
			largest = math.Max(largest, back)
			at := i*m + k
			if got := find(s, "two").Value.Num[at]; !near(got, two) {
				t.Fatalf("two of P%d, Q%d: got %g, want %g", i, k, got, two)
			}
			if got := find(s, "pick").Value.Num[at]; !near(got, pick) {
				t.Fatalf("pick of P%d, Q%d: got %g, want %g", i, k, got, pick)
			}
		}
		if got := find(s, "most").Value.Num[i]; !near(got, largest) {
			t.Fatalf("most of P%d: got %g, want %g", i, got, largest)
		}
		if got := find(s, "p.a").Value.Num[i]; got != a {
			t.Fatalf("the column p.a was changed: entry %d is %g", i, got)
		}
	}
	if got := find(s, "all").Value.Num[0]; math.Abs(got-total) > 1e-9*math.Abs(total) {
		t.Errorf("all: got %g, want %g", got, total)
	}
}
