package fonts

import (
	"math"
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"
)

// isMark reports whether a character is set above or below the one before it,
// as the bar of x̄ is.
func isMark(r rune) bool { return r >= 0x300 && unicode.Is(unicode.Mn, r) }

// Spell returns a text with each character that the face lacks in its spelling,
// where it has one.
func (f *Face) Spell(text string) string {
	lacks := func(r rune) bool { return r >= utf8.RuneSelf && !f.Has(r) }
	if !strings.ContainsFunc(text, lacks) {
		return text
	}
	var b strings.Builder
	for _, r := range text {
		if s := f.Spelling(r); s != "" {
			b.WriteString(s)
		} else {
			b.WriteRune(r)
		}
	}
	return b.String()
}

// Spelling returns a character as the face can set it: itself, or the letter
// and the marks that it is composed of; "" where the face lacks one of these.
func (f *Face) Spelling(r rune) string {
	if f.Has(r) {
		return string(r)
	}
	parts := norm.NFD.String(string(r))
	for i, p := range parts {
		if !f.Has(p) || i == 0 && p == r {
			return ""
		}
	}
	return parts
}

// Stretch is a part of a text that is set in one go, and where its origin is,
// from that of the text, in thousandths of an em, y upwards.
type Stretch struct {
	Text string
	X, Y int
}

// Stretches cuts a text at its marks, and places each over or under its letter:
// left to itself it would stand where the letter ends.
func (f *Face) Stretches(text string, put func(Stretch)) {
	if !strings.ContainsFunc(text, isMark) {
		put(Stretch{Text: text})
		return
	}
	x := 0               // of the pen
	from, at := 0, 0     // where the stretch at hand starts, in the text and on the line
	var letter rune      // that marks belong to
	var letterX int      // its place
	above, below := 0, 0 // the room that its marks have taken
	for i, r := range text {
		if !isMark(r) || letter == 0 {
			letter, letterX, above, below = r, x, 0, 0
			x += f.Advance(r)
			continue
		}
		if i > from {
			put(Stretch{Text: text[from:i], X: at})
		}
		dx, dy := f.over(letter, r)
		_, low, _, high := f.Bounds(f.Glyph(r))
		further := 0
		if high > 0 {
			further, above = above, above+high-low+markGap
		} else {
			further, below = -below, below+high-low+markGap
		}
		put(Stretch{Text: string(r), X: letterX + dx + f.rise(further), Y: dy + further})
		x += f.Advance(r)
		from, at = i+len(string(r)), x
	}
	if from < len(text) {
		put(Stretch{Text: text[from:], X: at})
	}
}

// markGap is the white between two marks of one letter.
const markGap = 60

// over is where the origin of a mark goes, from that of its letter. The marks of
// the faces have no width, stand in the middle above their origin, and at the
// height that suits a small letter.
func (f *Face) over(letter, mark rune) (x, y int) {
	left, bottom, right, top := f.Bounds(f.Glyph(letter))
	_, low, _, _ := f.Bounds(f.Glyph(mark))
	_, _, _, small := f.Bounds(f.Glyph('x'))
	if left == right { // a blank
		right = f.Advance(letter)
	}
	middle := (left+right)/2 - f.rise((bottom+top)/2) // at the line
	if low < 0 {                                      // below the line
		y = min(bottom, 0)
		return middle + f.rise(y), y
	}
	y = max(top-small, 0)
	return middle + f.rise(small+y), y
}

// rise is how far a slanted face leans to the right up to a height.
func (f *Face) rise(height int) int {
	return int(math.Round(f.slant() * float64(height)))
}

// slant is the tangent of the angle that an italic leans by.
func (f *Face) slant() float64 {
	post := f.Table("post")
	degrees := float64(int32(u32(post[4:]))) / 65536
	return math.Tan(-degrees * math.Pi / 180)
}
