// Package fonts holds the faces that pages are set in: IBM Plex, unmodified,
// under the SIL Open Font License (plex/LICENSE.txt). How the files were
// obtained stands in README.md.
//
// A PDF embeds a face from its TrueType file. A web page embeds the parts of a
// face that its characters need, as style rules with the data inside.
package fonts

import (
	"embed"
	"sync"
)

//go:embed plex/*.woff2 plex/*.css
var files embed.FS

// The TrueType files lie in the program's own memory: most of a face is never looked at.
var (
	//go:embed plex/IBMPlexSerif-Regular.ttf
	serif []byte
	//go:embed plex/IBMPlexSerif-Italic.ttf
	serifItalic []byte
	//go:embed plex/IBMPlexSerif-SemiBold.ttf
	serifSemiBold []byte
	//go:embed plex/IBMPlexSerif-SemiBoldItalic.ttf
	serifSemiBoldItalic []byte
	//go:embed plex/IBMPlexSans-Regular.ttf
	sans []byte
	//go:embed plex/IBMPlexSans-SemiBold.ttf
	sansSemiBold []byte
	//go:embed plex/IBMPlexMono-Regular.ttf
	mono []byte
	//go:embed plex/IBMPlexMath-Regular.ttf
	mathRegular []byte
)

// A Face is one embedded face. Faces are compared by pointer.
type Face struct {
	Name   string // as the face calls itself: "IBM Plex Serif"
	Short  string // the family's name in style sheets: "Plex Serif"
	Italic bool
	Weight int // 400 or 600
	TTF    []byte
	file   string
	glyphs func() *glyphs
	web    func() []part
	math   func() *MathTable
}

// The faces.
var (
	Serif               = newFace(serif, "Serif", "Regular", false, 400)
	SerifItalic         = newFace(serifItalic, "Serif", "Italic", true, 400)
	SerifSemiBold       = newFace(serifSemiBold, "Serif", "SemiBold", false, 600)
	SerifSemiBoldItalic = newFace(serifSemiBoldItalic, "Serif", "SemiBoldItalic", true, 600)
	Sans                = newFace(sans, "Sans", "Regular", false, 400)
	SansSemiBold        = newFace(sansSemiBold, "Sans", "SemiBold", false, 600)
	Mono                = newFace(mono, "Mono", "Regular", false, 400)
	Math                = newFace(mathRegular, "Math", "Regular", false, 400)
)

// Faces returns all faces.
func Faces() []*Face {
	return []*Face{Serif, SerifItalic, SerifSemiBold, SerifSemiBoldItalic, Sans, SansSemiBold, Mono, Math}
}

func newFace(ttf []byte, family, style string, italic bool, weight int) *Face {
	f := &Face{
		Name: "IBM Plex " + family, Short: "Plex " + family,
		Italic: italic, Weight: weight, TTF: ttf,
		file: "plex/IBMPlex" + family + "-" + style,
	}
	f.glyphs = sync.OnceValue(func() *glyphs { return readGlyphs(f.TTF) })
	f.web = sync.OnceValue(f.webParts)
	f.math = sync.OnceValue(func() *MathTable { return readMath(f.Table("MATH")) })
	return f
}

// read returns an embedded file, which is there since the program was built.
func read(name string) []byte {
	b, err := files.ReadFile(name)
	if err != nil {
		panic(err)
	}
	return b
}

// Has reports whether a face has a character up to U+FFFF. The characters
// beyond are left out even where the face has them: the PDF writer's library
// cannot set them.
func (f *Face) Has(r rune) bool { return f.glyphs().index(r) != 0 }

// Glyph returns the index of a character's glyph; 0 is the glyph for what the
// face does not have.
func (f *Face) Glyph(r rune) uint16 { return f.glyphs().index(r) }

// Advance returns the width of a character in thousandths of an em, as a PDF
// reader takes it; that of the missing glyph where the face has none.
func (f *Face) Advance(r rune) int {
	g := f.glyphs()
	return int(g.advances[g.index(r)])
}

// GlyphAdvance returns the width of a glyph in thousandths of an em.
func (f *Face) GlyphAdvance(glyph uint16) int {
	g := f.glyphs()
	if int(glyph) >= len(g.advances) {
		return 0
	}
	return int(g.advances[glyph])
}

// Bounds returns the box of a glyph's ink in thousandths of an em, y upwards;
// all zero for a blank.
func (f *Face) Bounds(glyph uint16) (xMin, yMin, xMax, yMax int) {
	return f.glyphs().bounds(glyph)
}

// Table returns a table of the TrueType file, nil where it has none of that tag.
func (f *Face) Table(tag string) []byte { return table(f.TTF, tag) }

// Width returns the width of a text in thousandths of an em.
func (f *Face) Width(text string) int {
	g := f.glyphs()
	sum := 0
	for _, r := range text {
		sum += int(g.advances[g.index(r)])
	}
	return sum
}
