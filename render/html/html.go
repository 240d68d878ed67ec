// Package html writes a page as one self-contained HTML file: faces and images
// are inside, there is no script, and nothing is fetched.
//
//	os.WriteFile("C-104_B.html", html.Append(nil, render.NewPage(sheet)), 0o666)
//
// The text goes through three columns (reference, calculation, output) that
// fall into one on a narrow screen. Formulas are MathML. The tree of the prose
// is read and never changed, so that a sheet may be written any number of
// times, by several goroutines at once.
package html

import (
	"encoding/binary"
	"slices"
	"unicode/utf8"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/fonts"
	"gusset/render/maths"
)

// Append appends the HTML file of a page.
func Append(dst []byte, p *render.Page) []byte {
	w := &writer{page: p, sheet: p.Sheet, source: p.Sheet.Source.Text}
	from := len(dst)
	w.b = slices.Grow(dst, headSize+grown*len(w.source))
	w.head()
	faces := len(w.b)
	w.styles()
	body := len(w.b)
	w.body()
	w.raw("</body>\n</html>\n")
	var runes fonts.Runes
	addRunes(&runes, w.b[from:faces])
	addRunes(&runes, w.b[body:])
	return insert(w.b, faces, w.faces(&runes))
}

// grown is how many bytes of a page a byte of a calc grows to, and headSize how
// many its head has with the faces, and a little more.
const (
	grown    = 22
	headSize = 1 << 19
)

// insert inserts texts at a place of b.
func insert(b []byte, at int, texts []string) []byte {
	size := 0
	for _, s := range texts {
		size += len(s)
	}
	end := len(b)
	b = slices.Grow(b, size)[:end+size]
	copy(b[at+size:], b[at:end])
	for _, s := range texts {
		at += copy(b[at:], s)
	}
	return b
}

// writer writes a page.
type writer struct {
	b      []byte
	page   *render.Page
	sheet  *notebook.Sheet
	source []byte
	inset  float64 // millimetres that quotes and lists set the present block in
	mono   bool    // the page has code
	strong bool    // the page has text that is both bold and italic
}

// head writes the head as far as its styles.
func (w *writer) head() {
	f := &w.sheet.Front
	w.raw("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n" +
		// A reader of a file from outside is safe even from what the writer lets through.
		"<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; style-src 'unsafe-inline'; img-src data:; font-src data:\">\n" +
		"<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n<title>")
	w.text(f.Calc)
	if f.Rev != "" {
		w.raw(" rev ")
		w.text(f.Rev)
	}
	if f.Title != "" {
		w.raw(": ")
		w.text(f.Title)
	}
	w.raw("</title>\n")
	if f.By.Name != "" {
		w.raw(`<meta name="author" content="`)
		w.text(f.By.Name)
		w.raw("\">\n")
	}
	w.raw("<style>\n")
}

// styles writes the rest of the head, before which the faces come.
func (w *writer) styles() {
	w.raw(maths.CSS)
	w.raw(sheetCSS)
	w.paper(w.page)
	w.raw("</style>\n</head>\n<body>\n")
}

// faces are the style rules for the faces of the page: its characters tell
// which parts of them it needs.
func (w *writer) faces(runes *fonts.Runes) []string {
	faces := []*fonts.Face{fonts.Serif, fonts.SerifItalic, fonts.SerifSemiBold, fonts.Sans, fonts.SansSemiBold, fonts.Math}
	if w.mono {
		faces = append(faces, fonts.Mono)
	}
	if w.strong {
		faces = append(faces, fonts.SerifSemiBoldItalic)
	}
	return fonts.Rules(runes, faces...)
}

// addRunes adds the characters of a text that is ASCII for the most part.
func addRunes(runes *fonts.Runes, text []byte) {
	runes.Add([]byte("az09"))
	for len(text) >= 8 {
		if len(text) >= 32 && beyond(text)|beyond(text[8:])|beyond(text[16:])|beyond(text[24:]) == 0 {
			text = text[32:]
			continue
		}
		if beyond(text) == 0 {
			text = text[8:]
			continue
		}
		n := 8
		for n < len(text) && !utf8.RuneStart(text[n]) {
			n++
		}
		runes.Add(text[:n])
		text = text[n:]
	}
	runes.Add(text)
}

// beyond are the high bits of the next eight bytes: zero where they are ASCII.
func beyond(text []byte) uint64 { return binary.LittleEndian.Uint64(text) & 0x8080808080808080 }

func (w *writer) body() {
	w.raw("<div class=\"sheet\">\n<header>\n")
	w.titleBlock()
	w.stateBox()
	w.raw("</header>\n<div class=\"row cols\" aria-hidden=\"true\"><div class=\"ref\">Reference</div><div class=\"mid\">Calculation</div><div class=\"out\">Output</div></div>\n<main>\n")
	w.contents()
	w.raw("</div>\n")
}

func (w *writer) raw(s string) { w.b = append(w.b, s...) }

// text appends character data or an attribute's value.
func (w *writer) text(s string) { w.b = maths.AppendText(w.b, s) }

// figures appends a cell or a label: plain text whose powers of ten are set as
// superscripts, since the faces have no raised minus.
func (w *writer) figures(s string) {
	for {
		i := indexPower(s)
		if i < 0 {
			w.text(s)
			return
		}
		w.text(s[:i])
		w.raw("<sup>")
		s = s[i:]
		for len(s) > 0 {
			r, size := utf8.DecodeRuneInString(s)
			d, ok := lowered(r)
			if !ok {
				break
			}
			if d == '-' {
				w.raw("−")
			} else {
				w.b = append(w.b, d)
			}
			s = s[size:]
		}
		w.raw("</sup>")
	}
}

// indexPower finds a run of superscript characters that starts with a minus,
// or that stands behind ×10; -1 where there is none.
func indexPower(s string) int {
	for i, r := range s {
		d, ok := lowered(r)
		if ok && (d == '-' || i >= 4 && s[i-4:i] == "×10") {
			return i
		}
	}
	return -1
}

// lowered is the figure or sign of a superscript character.
func lowered(r rune) (byte, bool) {
	switch r {
	case '⁻':
		return '-', true
	case '¹':
		return '1', true
	case '²', '³':
		return byte('2' + r - '²'), true
	}
	if r == '⁰' || r >= '⁴' && r <= '⁹' {
		return byte('0' + r - '⁰'), true
	}
	return 0, false
}
