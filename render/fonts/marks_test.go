package fonts

import (
	"slices"
	"strings"
	"testing"
)

// A mark stands in the middle above or below its letter, at the height that it
// has above a small one, and the text behind it where it would be without.
func TestStretches(t *testing.T) {
	for _, f := range []*Face{Serif, SerifItalic, SerifSemiBold, SerifSemiBoldItalic, Sans, SansSemiBold, Mono} {
		for _, c := range []string{"x\u0304", "λ\u0304", "σ\u0302", "V\u0303", "ẍ", "d\u0323", "g\u0323"} {
			c = f.Spell(c)
			var list []Stretch
			f.Stretches("a"+c+"b", func(s Stretch) { list = append(list, s) })
			if len(list) != 3 {
				t.Errorf("%s: %q in %d stretches, want 3", f.file, c, len(list))
				continue
			}
			letter, mark := []rune(c)[0], []rune(c)[1]
			if want := f.Width("a" + string(letter)); list[2].X != want || list[2].Y != 0 {
				t.Errorf("%s: what follows %q stands at %d, %d, want %d, 0", f.file, c, list[2].X, list[2].Y, want)
			}
			l, bottom, r, top := f.Bounds(f.Glyph(letter))
			ml, low, mr, high := f.Bounds(f.Glyph(mark))
			low, high = low+list[1].Y, high+list[1].Y
			middle := float64(l+r)/2 + f.slant()*float64(low+high-bottom-top)/2 + float64(f.Advance('a'))
			if d := float64(list[1].X) + float64(ml+mr)/2 - middle; d < -25 || d > 25 {
				t.Errorf("%s: the mark of %q stands %.0f beside its letter's middle", f.file, c, d)
			}
			gap := low - top
			if mark == '\u0323' {
				gap = min(bottom, 0) - high
			}
			if gap < 30 || gap > 200 {
				t.Errorf("%s: %q has %d between letter and mark", f.file, c, gap)
			}
		}
	}
}

func TestMarksOfOneLetter(t *testing.T) {
	var list []Stretch
	Serif.Stretches("x\u0304\u0302\u0323", func(s Stretch) { list = append(list, s) })
	if len(list) != 4 || list[2].Y < list[1].Y+100 || list[3].Y != 0 {
		t.Errorf("a bar, a hat and a dot below: %v", list)
	}
}

// A mark without a letter stands where it is, and what has none is one stretch.
func TestNoMarks(t *testing.T) {
	for _, s := range []string{"", "tau = 3 MPa", "τ ≤ 0.9·σ", "\u0304", "\u0304x"} {
		var list []Stretch
		Serif.Stretches(s, func(s Stretch) { list = append(list, s) })
		if s != "" && !slices.Equal(list, []Stretch{{Text: s}}) {
			t.Errorf("%q: %v", s, list)
		}
	}
}

func TestSpelling(t *testing.T) {
	for _, c := range []struct {
		r    rune
		want string
	}{
		{'é', "é"}, {'ȳ', "y\u0304"}, {'ẍ', "x\u0308"}, {'τ', "τ"}, {'中', ""}, {'\u20d7', ""},
	} {
		if got := Serif.Spelling(c.r); got != c.want {
			t.Errorf("%c is spelt %q, want %q", c.r, got, c.want)
		}
	}
	if got := Serif.Spell("ȳ 中 é"); got != "y\u0304 中 é" || strings.Contains(got, "ȳ") {
		t.Errorf("the text is spelt %q", got)
	}
}
