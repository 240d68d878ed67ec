package pdf

import (
	"fmt"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// stacked describes pages: the names of slabs, pages parted by bars.
func stacked(pages [][]placed) string {
	var out []string
	for _, p := range pages {
		var names []string
		for _, s := range p {
			names = append(names, s.anchors[0])
		}
		out = append(out, strings.Join(names, " "))
	}
	return strings.Join(out, " | ")
}

func TestPaginate(t *testing.T) {
	head := &slab{height: 10, anchors: []string{"H"}}
	named := func(name string, height float64) slab { return slab{height: height, anchors: []string{name}} }
	kept := func(s slab) slab { s.keep = true; return s }
	under := func(s slab) slab { s.head = head; return s }
	after := func(gap float64, s slab) slab { s.gap = gap; return s }
	tests := []struct {
		name  string
		slabs []slab
		want  string
	}{
		{"what fits", []slab{named("a", 40), named("b", 40)}, "a b"},
		{"what does not", []slab{named("a", 40), named("b", 40), named("c", 40)}, "a b | c"},
		{"the first page is shorter", []slab{named("a", 40), named("b", 50)}, "a | b"},
		{"a gap counts", []slab{named("a", 40), after(2, named("b", 39))}, "a | b"},
		{"but not at the head of a page", []slab{named("a", 80), after(30, named("b", 100))}, "a | b"},
		{"kept with the next", []slab{named("a", 40), kept(named("b", 20)), named("c", 30)}, "a | b c"},
		{"a chain of three", []slab{named("a", 40), kept(named("b", 20)), kept(named("c", 10)), named("d", 20)}, "a | b c d"},
		{"a chain that no page holds starts where it is", []slab{named("a", 10), kept(named("b", 60)), kept(named("c", 60)), named("d", 30)}, "a b | c d"},
		{"and on a new page near the foot", []slab{named("a", 79), kept(named("b", 60)), kept(named("c", 60)), named("d", 30)}, "a | b | c d"},
		{"a head is repeated", []slab{kept(named("H", 10)), under(named("a", 60)), under(named("b", 60)), under(named("c", 60))}, "H a | H b | H c"},
		{"a slab taller than a page", []slab{named("a", 10), named("b", 150), named("c", 10)}, "a | b | c"},
		{"nothing", nil, ""},
	}
	for _, tt := range tests {
		// Pages hold 100 from 20 on, the first one 80.
		if got := stacked(paginate(tt.slabs, 40, 20, 120)); got != tt.want {
			t.Errorf("%s: got %s, want %s", tt.name, got, tt.want)
		}
	}
}

// Every slab is on one page, in order, none below the foot that a page could
// hold, and no page ends with a slab that is kept with the next if both fit on
// one.
func TestPaginateKeeps(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(0, 60).Draw(t, "n")
		slabs := make([]slab, n)
		for i := range slabs {
			slabs[i] = slab{
				height: rapid.Float64Range(1, 30).Draw(t, "height"), gap: rapid.Float64Range(0, 9).Draw(t, "gap"),
				keep: rapid.Float64Range(0, 1).Draw(t, "keep") < 0.3, anchors: []string{fmt.Sprint(i)},
			}
		}
		next := 0
		for _, page := range paginate(slabs, 40, 20, 120) {
			for i, s := range page {
				if s.anchors[0] != fmt.Sprint(next) {
					t.Fatalf("slab %s stands where %d should", s.anchors[0], next)
				}
				next++
				if s.y+s.height > 120.001 {
					t.Fatalf("slab %s ends at %.1f", s.anchors[0], s.y+s.height)
				}
				if i == len(page)-1 && s.keep && next < n {
					from := next - 1
					for from > 0 && slabs[from-1].keep {
						from--
					}
					to := next
					for to < n-1 && slabs[to].keep {
						to++
					}
					// Nothing leaves the first page empty.
					if from > 0 && extent(slabs[from:to+1], true) <= 100 {
						t.Fatalf("slabs %d to %d are kept together and are not", from, to)
					}
				}
			}
		}
		if next != n {
			t.Fatalf("%d of %d slabs are on pages", next, n)
		}
	})
}

// No page begins or ends with a single line of a paragraph, or ends with a
// heading.
func TestNoWidows(t *testing.T) {
	text := front
	for i := range 40 {
		text += fmt.Sprintf("\n# Heading %d\n\n%s\n", i, strings.Repeat("some words that fill the lines of a paragraph ", 3+i%7))
	}
	l := newDocument(pageOf(t, text, nil)).layout()
	inFrame(t, l)
	for n, page := range l.pages[:len(l.pages)-1] {
		last := page[len(page)-1]
		if last.heading != nil {
			t.Errorf("page %d ends with a heading", n+1)
		}
		if last.keep {
			t.Errorf("page %d ends within what is kept together", n+1)
		}
	}
}
