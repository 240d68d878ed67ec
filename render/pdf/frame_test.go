package pdf

import (
	"testing"

	"gusset/render/maths"
)

// inFrame fails where something is printed outside of the sheet's margins, or
// where what a page holds overlaps.
func inFrame(t testing.TB, l *layout) {
	t.Helper()
	const slack = 0.6 // a letter may lean out a little
	for n, page := range l.pages {
		low := 0.0
		for i := range page {
			s := &page[i]
			if s.y < low-0.01 {
				t.Errorf("page %d: a slab starts at %.1f, above the end of the one before at %.1f", n+1, s.y, low)
			}
			low = s.y + s.height
			if low > l.paper.foot()+0.01 {
				t.Errorf("page %d: a slab of %.1f ends at %.1f, below the foot at %.1f", n+1, s.height, low, l.paper.foot())
			}
			within(t, l, n, &s.ink, slack)
		}
	}
	within(t, l, 0, &l.title.ink, slack)
}

func within(t testing.TB, l *layout, page int, k *ink, slack float64) {
	t.Helper()
	check := func(what string, x, w float64) {
		if x < -slack || x+w > l.paper.inner()+slack {
			t.Errorf("page %d: `%s` runs from %.1f to %.1f on a sheet %.1f wide", page+1, what, x, x+w, l.paper.inner())
		}
	}
	for _, x := range k.texts {
		if x.items == nil {
			check(x.text, x.x, x.width(x.text))
		}
		for _, i := range x.items {
			if i.Kind != maths.Outline {
				check("formula "+i.Text, x.x+i.X*x.scale, i.Width*x.scale)
			}
		}
	}
	for _, f := range k.fills {
		check("a rule", f.x, f.w)
	}
	for _, p := range k.pictures {
		check("a picture", p.x, p.w)
	}
}
