package html_test

import (
	"bytes"
	"fmt"
	"runtime"
	"strings"
	"testing"

	"gusset/render"
	"gusset/render/html"
)

// uneven is a calc whose first block prints so many long tables, far more for
// each byte of the source than the prose that follows.
func uneven(tables int) string {
	var b strings.Builder
	b.WriteString("---\ncalc: C-1\n---\n\n")
	for _, name := range []string{"r", "s"} {
		fmt.Fprintf(&b, "```schedule %s\nmark | x [mm]\n", name)
		for i := range 50 {
			fmt.Fprintf(&b, "%s%d | %d\n", name, i, i+1)
		}
		b.WriteString("```\n\n")
	}
	b.WriteString("```calc\n")
	for i := range tables {
		fmt.Fprintf(&b, "a%d = r.x*s.x\n", i)
	}
	b.WriteString("```\n")
	for i := range 400 {
		fmt.Fprintf(&b, "\nParagraph %d.\n", i)
	}
	return b.String()
}

// The parts of a page are the same bytes on any number of processors, also
// where one grows far beyond its share of the room.
func TestParts(t *testing.T) {
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(0))
	for tables := range 9 {
		s := compileBytes(t, []byte(uneven(tables)))
		var want []byte
		for _, processors := range []int{1, 2, 3, 8} {
			runtime.GOMAXPROCS(processors)
			got := html.Append(nil, render.NewPage(s))
			if want == nil {
				want = got
			}
			if !bytes.Equal(got, want) {
				t.Errorf("%d tables on %d processors: other bytes than on one", tables, processors)
			}
		}
	}
}

// A long result may part from its unit, which itself stays whole; a short one
// does not.
func TestLongOutputsPart(t *testing.T) {
	s := compileBytes(t, []byte("---\ncalc: C-1\n---\n```calc\nK = 700 MPa * sqrt(1 mm)\nk = 2*3 1/m\n```\n"))
	page := string(html.Append(nil, render.NewPage(s)))
	for _, want := range []string{"\u00a0<wbr>kg/(m<sup>1/2</sup>·s²)", "6.000\u00a0\u202f1/m"} {
		if !strings.Contains(page, want) {
			t.Errorf("the page lacks %q", want)
		}
	}
}
