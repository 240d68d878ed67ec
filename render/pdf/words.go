package pdf

import (
	"math"
	"strings"
	"unicode"
	"unicode/utf8"

	"gusset/render"
	"gusset/render/fonts"
)

// piece is a part of a line that is set as one: a text in one style, or a box.
type piece struct {
	style
	text  string
	box   *box
	width float64
}

// word is a run of pieces that no line breaks within. Space is the blank
// behind it, which vanishes at a line's end; cost is what a break there is
// worth avoiding. The line must end behind a word that ends.
type word struct {
	from, to     int // its pieces
	width, space float64
	cost         float64
	ends         bool
}

// paragraph is running text before it is broken into lines. It is built by
// write, place and end, and never changes afterwards.
type paragraph struct {
	pieces []piece
	words  []word
	open   bool // the last word may still grow
}

// Costs of a break that leaves more than a blank behind, on the scale of
// lineCost.
const (
	hyphenCost = 0.4
	slashCost  = 1.5
	numberCost = 1.4 // before a number, which belongs to the word before it: Table 3
	tableCost  = 8   // the same in the narrow column of references
	unitCost   = 12  // between a number and its unit
)

// write appends a text in a style. Blanks and ends of lines in it part words.
func (p *paragraph) write(st style, s string) {
	s = settable(s)
	if p.words == nil {
		p.words, p.pieces = make([]word, 0, len(s)/6+2), make([]piece, 0, len(s)/6+2)
	}
	for s != "" {
		i := blankOrBreak(s)
		if i < 0 {
			p.letters(st, s)
			return
		}
		p.letters(st, s[:i])
		if s[i] == ' ' {
			p.blank(st)
			if measured := render.Measured(s[:i], s[i+1:]); measured && len(p.words) > 0 {
				p.words[len(p.words)-1].cost = unitCost
			}
			s = s[i+1:]
		} else {
			p.part(0)
			s = s[i+len("\u200B"):]
		}
	}
}

// blankOrBreak is the first place in a text where it has a blank or a
// zero-width space, -1 where it has none.
func blankOrBreak(s string) int {
	i := strings.IndexByte(s, ' ')
	if j := strings.Index(s, "\u200B"); j >= 0 && (i < 0 || j < i) {
		return j
	}
	return i
}

// verbatim appends a text whose blanks count. A line may break behind them.
func (p *paragraph) verbatim(st style, s string) {
	s = settable(s)
	for s != "" {
		end := len(s)
		if i := strings.IndexByte(strings.TrimLeft(s, " "), ' '); i >= 0 {
			end = len(s) - len(strings.TrimLeft(strings.TrimLeft(s, " ")[i:], " "))
		}
		p.append(st, s[:end])
		if end < len(s) {
			p.part(0)
		}
		s = s[end:]
	}
}

// letters appends a text without blanks, with places to break behind hyphens
// and dashes and, where it is long, behind slashes and full stops.
func (p *paragraph) letters(st style, s string) {
	long := utf8.RuneCountInString(s) > 24
	from := 0
	for i, r := range s {
		end := i + utf8.RuneLen(r)
		if end == len(s) {
			break
		}
		if cost, ok := breaksBehind(r, s[:i], s[end:], long); ok {
			p.append(st, s[from:end])
			p.part(cost)
			from = end
		}
	}
	if from < len(s) {
		p.append(st, s[from:])
	}
}

func breaksBehind(r rune, before, after string, long bool) (cost float64, ok bool) {
	last, _ := utf8.DecodeLastRuneInString(before)
	next, _ := utf8.DecodeRuneInString(after)
	switch r {
	case '-', '‐':
		return hyphenCost, unicode.IsLetter(last) && unicode.IsLetter(next)
	case '–', '—':
		return hyphenCost / 2, before != ""
	case '/', '.', '?', '&', '_', '=', ',':
		return slashCost, long && unicode.IsLetter(next)
	}
	return 0, false
}

func (p *paragraph) append(st style, s string) {
	if hasAll(st.face, s) {
		p.grow(piece{style: st, text: s, width: st.width(s)})
		return
	}
	for _, sp := range spans(st.face, s) {
		in := st.in(sp.face)
		if sp.code != 0 {
			p.place(in, codeBox(in, sp.code))
			continue
		}
		p.grow(piece{style: in, text: sp.text, width: in.width(sp.text)})
	}
}

// place appends a box as part of the word that is open.
func (p *paragraph) place(st style, b *box) {
	p.grow(piece{style: st, box: b, width: b.width})
}

func (p *paragraph) grow(c piece) {
	if !p.open {
		if n := len(p.words); n > 0 && (startsNumber(c.text) || p.revision(n-1)) {
			p.words[n-1].cost = math.Max(p.words[n-1].cost, numberCost)
		}
		p.words = append(p.words, word{from: len(p.pieces)})
		p.open = true
	}
	w := &p.words[len(p.words)-1]
	if n := len(p.pieces); n > w.from && c.box == nil && p.pieces[n-1].box == nil && p.pieces[n-1].style == c.style {
		p.pieces[n-1].text += c.text
		p.pieces[n-1].width += c.width
	} else {
		p.pieces = append(p.pieces, c)
	}
	w.to = len(p.pieces)
	w.width += c.width
}

// revision tells whether a word stands before the letter of a revision: rev B.
func (p *paragraph) revision(i int) bool {
	w := p.words[i]
	return w.to > w.from && p.pieces[w.to-1].text == "rev"
}

// startsNumber reports whether a text begins a number: 3, or J3.2 of a code.
func startsNumber(s string) bool {
	if s != "" && s[0] >= 'A' && s[0] <= 'Z' {
		s = s[1:]
	}
	return s != "" && s[0] >= '0' && s[0] <= '9'
}

// blank ends the open word with a space.
func (p *paragraph) blank(st style) {
	if p.open {
		p.words[len(p.words)-1].space = st.width(" ")
		p.open = false
	}
}

// part ends the open word where a line may break without a space.
func (p *paragraph) part(cost float64) {
	if p.open {
		p.words[len(p.words)-1].cost = cost
		p.open = false
	}
}

// end ends the line, as a hard break does.
func (p *paragraph) end() {
	if len(p.words) > 0 {
		p.words[len(p.words)-1].ends = true
		p.open = false
	}
}

// natural is the width of the paragraph when no line is broken, and least
// that of its widest word.
func (p *paragraph) natural() (natural, least float64) {
	line := 0.0
	for _, w := range p.words {
		line += w.width
		natural, least = math.Max(natural, line), math.Max(least, w.width)
		line += w.space
		if w.ends {
			line = 0
		}
	}
	return natural, least
}

// linesAt is how many lines the paragraph has at a width that no word is wider than.
func (p *paragraph) linesAt(width float64) int {
	n, x := 1, 0.0
	for i, w := range p.words {
		if x > 0 && x+w.width > width+0.01 || i > 0 && p.words[i-1].ends {
			n, x = n+1, 0
		}
		x += w.width + w.space
	}
	return n
}

// solid is the width of the widest word that shall not be cut: one with a
// formula in it, or a number, which would read as two.
func (p *paragraph) solid() float64 {
	widest := 0.0
	for _, w := range p.words {
		if w.width <= widest {
			continue
		}
		for _, c := range p.pieces[w.from:w.to] {
			if c.box != nil || strings.Trim(c.text, "0123456789.,+-−") == "" {
				widest = w.width
			}
		}
	}
	return widest
}

// fitted returns the paragraph with the words that are wider than a line cut
// between characters, and itself where there are none.
func (p *paragraph) fitted(width float64) *paragraph {
	wide := false
	for _, w := range p.words {
		wide = wide || w.width > width
	}
	if !wide {
		return p
	}
	out := &paragraph{}
	for _, w := range p.words {
		if w.width > width {
			out.cut(p.pieces[w.from:w.to], width)
		} else {
			for _, c := range p.pieces[w.from:w.to] {
				out.grow(c)
			}
		}
		last := &out.words[len(out.words)-1]
		last.space, last.cost, last.ends = w.space, w.cost, w.ends
		out.open = false
	}
	return out
}

// cut appends pieces as words no wider than a line, a new word at each place
// where the next character would not fit.
func (p *paragraph) cut(pieces []piece, width float64) {
	used := 0.0
	for _, c := range pieces {
		if c.box != nil {
			if c.width > width { // a formula has no place to be cut
				c.box = c.box.scaled(width / c.width)
				c.width = width
			}
			if used > 0 && used+c.width > width {
				p.open, used = false, 0
			}
			p.grow(c)
			used += c.width
			continue
		}
		from := 0
		for i, r := range c.text {
			w := float64(c.face.Advance(r)) * c.size / 1000
			if used > 0 && used+w > width {
				p.growText(c, c.text[from:i])
				p.open, used, from = false, 0, i
			}
			used += w
		}
		p.growText(c, c.text[from:])
	}
}

func (p *paragraph) growText(c piece, s string) {
	if s != "" {
		p.grow(piece{style: c.style, text: s, width: c.style.width(s)})
	}
}

// codeBox draws the code of a character that no face has, in a frame.
func codeBox(st style, r rune) *box {
	const pad, rule = 1.2, 0.35
	st = st.in(fonts.Sans)
	st.size *= 0.68
	s := codeText(r)
	w := st.width(s) + 2*pad
	h := st.size*0.72 + 2*pad
	b := &box{width: w + 1, ascent: h - pad, descent: pad}
	x := 0.5
	b.ink.fill(x, -b.ascent, w, rule, st.colour)
	b.ink.fill(x, pad-rule, w, rule, st.colour)
	b.ink.fill(x, -b.ascent, rule, h, st.colour)
	b.ink.fill(x+w-rule, -b.ascent, rule, h, st.colour)
	b.ink.texts = append(b.ink.texts, text{x: x + pad, y: 0, style: st, text: s})
	return b
}
