package pdf

import (
	"math"
	"testing"
)

// A table whose words do not fit: one endless word leaves the others their room,
// and numbers stay whole as long as there is room for them.
func TestTableTooWide(t *testing.T) {
	row := func(texts ...string) gridRow {
		var r gridRow
		for _, s := range texts {
			r.cells = append(r.cells, gridCell{p: words(s)})
		}
		return r
	}
	const total = 200.0
	for _, c := range []struct {
		name  string
		row   gridRow
		whole []int // columns that are as wide as their widest word
	}{
		{"one endless word", row("mmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmmm", "some words of text"), []int{1}},
		{"numbers among words", row("mmmmmmmmmmmm", "3.14159265", "wwwwwwwwwwww", "−2718.28", "aa"), []int{1, 3, 4}},
	} {
		g := &grid{rows: []gridRow{c.row}}
		widths, gap, _ := g.widths(total)
		if all := sum(widths) + gap*float64(len(widths)-1); all > total+1e-6 || all < total-1 {
			t.Errorf("%s: %.1f wide, of %.1f", c.name, all, total)
		}
		for _, i := range c.whole {
			if _, least := c.row.cells[i].p.natural(); widths[i] < least-1e-6 {
				t.Errorf("%s: column %d is %.1f wide, its word %.1f", c.name, i, widths[i], least)
			}
		}
	}
}

// Between texts that do not all fit, short ones stay on their line and a long
// one breaks; of two ways to do so the one with fewer lines is taken.
func TestTableOfFewLines(t *testing.T) {
	const total = 200.0
	build := func(rows ...[]string) *grid {
		g := &grid{}
		for i, texts := range rows {
			var r gridRow
			for _, s := range texts {
				r.cells = append(r.cells, gridCell{p: words(s)})
			}
			if i == 0 {
				g.head = r
			} else {
				g.rows = append(g.rows, r)
			}
		}
		return g
	}
	remark := "a remark that is much too long to stand on one line of so narrow a table"
	for _, c := range []struct {
		name string
		g    *grid
		once []int // columns of which no cell breaks
	}{
		{"heads", build([]string{"mark", "b [mm]", "h [mm]", "remark"}, []string{"A", "22", "14", remark}), []int{0, 1, 2}},
		{"marks", build([]string{"mark", "b [mm]", "remark"}, []string{"LC02 G + Wx", "1", "wind"}, []string{"LC03 G + Wx", "2", remark}, []string{"LC04 G + Wx", "3", "wind"}, []string{"LC05 G + Wx", "4", "wind"}), []int{0}},
	} {
		widths, gap, fits := c.g.widths(total)
		if all := sum(widths) + gap*float64(len(widths)-1); !fits || all > total+1e-6 {
			t.Errorf("%s: %.1f wide, of %.1f", c.name, all, total)
		}
		for _, i := range c.once {
			for _, r := range append(c.g.rows, c.g.head) {
				if n := r.cells[i].p.linesAt(widths[i]); n > 1 {
					t.Errorf("%s: column %d of %.1f has %d lines", c.name, i, widths[i], n)
				}
			}
		}
	}
}

// A formula wider than its cell is set smaller, since it has no place to be cut.
func TestFormulaInANarrowCell(t *testing.T) {
	p := &paragraph{}
	p.place(proseVoice.style(), &box{width: 80, ascent: 10, descent: 4})
	for _, w := range p.fitted(20).words {
		if math.Abs(w.width-20) > 1e-6 {
			t.Errorf("%.1f wide, want 20", w.width)
		}
	}
}
