package maths

import (
	"unicode/utf8"

	"gusset/render/fonts"
)

// overhang is how far, in thousandths of an em, the last letter of an italic
// name leans out over the room it takes.
func overhang(letters string) int {
	r, _ := utf8.DecodeLastRuneInString(letters)
	glyph := fonts.SerifItalic.Glyph(r)
	_, _, right, _ := fonts.SerifItalic.Bounds(glyph)
	return max(0, right-fonts.SerifItalic.GlyphAdvance(glyph))
}

// backhang is how far the first letter of an italic name reaches back.
func backhang(letters string) int {
	r, _ := utf8.DecodeRuneInString(letters)
	left, _, _, _ := fonts.SerifItalic.Bounds(fonts.SerifItalic.Glyph(r))
	return max(0, -left)
}
