package pdf

import (
	"fmt"
	"strings"
	"testing"

	"gusset/render/maths"
	"gusset/units"
)

// texts are the texts of a page with their places, from the top of the sheet.
func texts(page []placed) []text {
	var out []text
	for _, s := range page {
		for _, t := range s.ink.texts {
			t.y += s.y + s.pad
			out = append(out, t)
		}
	}
	return out
}

func find(list []text, s string) *text {
	for i := range list {
		if strings.Contains(list[i].text, s) {
			return &list[i]
		}
	}
	return nil
}

// What a value is stands close below it, however much stands in the columns
// beside it.
func TestNoteBelowItsLine(t *testing.T) {
	loads := "---\ncalc: C-2\nrev: A\ntitle: Loads of the anchors at the holding-down points of a machine\n---\n```cases\ncase | N [kN]\nC1 a case with a long name that needs lines | 4\nC2 another | 2\n```\n"
	l := newDocument(pageOf(t, strings.Replace(front, "\n---\n", "\nfrom: {loads: loads.md}\n---\n", 1)+
		"```calc\nN = loads.N   # Pull on an anchor\nm = max(N)    # The largest\ncheck N <= 9 kN\n```\n", map[string]string{"loads.md": loads})).layout()
	inFrame(t, l)
	list := texts(l.pages[0])
	// The case stands beside the value.
	value, note := find(list, "C1 a"), find(list, "Pull on an anchor")
	if value == nil || note == nil {
		t.Fatal("no value or no note")
	}
	if down := note.y - value.y; down < 8 || down > 16 {
		t.Errorf("the note stands %.1f below its value", down)
	}
}

// A further table of a check may start a page, which then says whose it is, and
// leaves no more white on the page before than the table would have filled.
func TestFurtherTablesStartPages(t *testing.T) {
	table := func(name string, n int) string {
		s := "```schedule " + name + "\nmark | x_" + name + " [kN]\n"
		for i := range n {
			s += fmt.Sprintf("%s%d | %d\n", name, i+1, i+1)
		}
		return s + "```\n"
	}
	split := 0
	for lines := range 40 {
		text := front + table("A", 6) + table("B", 6) + "\n" + strings.Repeat("A line of its own.\n\n", lines) +
			"```calc\ncheck A.x_A + B.x_B <= 99 kN # Sum\n```\n"
		l := newDocument(pageOf(t, text, nil)).layout()
		inFrame(t, l)
		for n, page := range l.pages {
			list := texts(page)
			second := find(list, "largest for each of B")
			if second == nil {
				continue
			}
			here, says := find(list, "largest for each of A") != nil, find(list, "(1) continued") != nil
			if says == here {
				t.Errorf("%d lines: sheet %d has the first table %v and says so %v", lines, n+1, here, says)
			}
			if !here {
				split++
			}
		}
	}
	if split == 0 {
		t.Error("no page starts with the second table")
	}
}

// Two tables of what a helper gives need not stand on one page.
func TestFurtherTablesOfResults(t *testing.T) {
	body := "```cases\ncase | V [kN]\nA | 3\nB | 4\nC | 5\n```\n```schedule bolts\nmark | x [mm] | y [mm]\nB1 | -70 | 60\nB2 | 70 | 60\nB3 | 0 | -60\n```\n\n"
	split := 0
	for lines := range 30 {
		l := newDocument(pageOf(t, front+body+strings.Repeat("A line of its own.\n\n", lines)+
			"```calc\ng = bolt_group_elastic(x=bolts.x, y=bolts.y, P_x=0 kN, P_y=-V, M=V*100 mm)\n```\n", nil)).layout()
		inFrame(t, l)
		for _, page := range l.pages {
			// The head of the first table goes on with the bolts, that of the
			// schedule with the cases' own.
			if list := texts(page); len(list) > 1 && list[0].text == "cases" && list[1].text == "" {
				split++
			}
		}
	}
	if split == 0 {
		t.Error("no page starts with the second table")
	}
}

// A result too long for its column keeps its exponents raised: its figures
// stand above its unit, or close together on a line.
func TestLongOutputs(t *testing.T) {
	unit := func(text string) maths.Unit {
		u, err := units.Parse(text)
		if err != nil {
			t.Fatal(err)
		}
		return maths.Unit(u.Terms())
	}
	d := newDocument(pageOf(t, front+"```calc\na = 1 mm\n```\n", nil))
	_, width := d.paper.output()
	for _, c := range []struct {
		n     maths.Number
		words int
	}{
		{maths.Number{Value: "384.0", Unit: unit("MPa")}, 1},
		{maths.Number{Value: "4.589e6", Unit: unit("kg/(m^(1/2)*s^2)")}, 2},
		{maths.Number{Value: "717381", Unit: unit("kg/(m^(1/2)*s^2)")}, 2},
	} {
		p := d.outputWords(c.n, width)
		if len(p.words) != c.words {
			t.Errorf("%s has %d parts, want %d", c.n.Value, len(p.words), c.words)
		}
		for _, piece := range p.pieces {
			if strings.Contains(piece.text, "^") {
				t.Errorf("%s is set as %q", c.n.Value, piece.text)
			}
		}
	}
}
