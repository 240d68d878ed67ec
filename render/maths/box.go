package maths

import (
	"strings"
	"unicode/utf8"

	"gusset/render/fonts"
)

// Box is a formula or a line of one, set for paper. Lengths are in the unit of
// the size that was asked for, points as a rule. The origin is at the left end
// of the baseline, x to the right and y down the page.
type Box struct {
	Width   float64
	Ascent  float64 // of the ink above the baseline
	Descent float64 // of the ink below it
	Items   []Item
}

// Kind is what an item draws.
type Kind uint8

const (
	Run     Kind = iota // Text in Face at Size, its baseline starting at X, Y
	Rule                // a filled rectangle, X, Y its upper left corner, Width by Height
	Outline             // Path, filled, its origin at X, Y, scaled by Size
)

// Item is one thing to draw.
type Item struct {
	Kind          Kind
	X, Y          float64
	Width, Height float64 // of a rule; the width of a run too
	Face          *fonts.Face
	Size          float64
	Text          string
	Path          []Segment
	Link          string // id of the place that the text leads to
}

// Segment is a part of an outline in thousandths of an em, y upwards: the
// point P is at X + P.X·Size/1000, Y - P.Y·Size/1000.
type Segment struct {
	Kind SegmentKind
	C, P Point // the control point of a curve, and the end
}

// SegmentKind is the kind of a segment.
type SegmentKind uint8

const (
	Move SegmentKind = iota // a new contour; the last one is closed
	Line
	Curve // quadratic
)

// Point is a point of an outline.
type Point struct{ X, Y float64 }

// Layout sets a node in one line, as a formula in running text: fractions and
// what stands in them are small. The face is for upright text and figures:
// fonts.Serif beside serif text.
func Layout(n Node, size float64, face *fonts.Face) Box {
	s := setter{size: size, text: face, metrics: fonts.MathMetrics()}
	p := s.row(n, style{})
	return s.box(p)
}

// A style is where in a formula something stands, as TeX has it.
type style struct {
	display bool // on a line of its own: fractions are full size
	level   int  // 0, 1 in scripts, 2 in scripts of scripts
	cramped bool // below something: superscripts are raised less
}

// script is the style of a superscript, crampedScript that of a subscript.
func (st style) script() style {
	return style{level: min(st.level+1, 2), cramped: st.cramped}
}

func (st style) crampedScript() style {
	return style{level: min(st.level+1, 2), cramped: true}
}

// over is the style of a numerator, under that of a denominator.
func (st style) over() style {
	if st.display {
		return style{level: st.level, cramped: st.cramped}
	}
	return st.script()
}

func (st style) under() style {
	st = st.over()
	st.cramped = true
	return st
}

// A setter sets nodes for paper. All items go to one list; a part is a stretch
// of that list with the room it takes, set with its origin at 0, 0 until it is
// moved.
type setter struct {
	size    float64
	text    *fonts.Face
	metrics *fonts.MathTable
	items   []Item
}

type part struct {
	width, ascent, descent float64
	from, to               int
	// lean is how far the last letter leans out over the width.
	lean float64
	// letter says that scripts sit as on a letter: the height does not matter.
	letter bool
}

func (s *setter) start() part { return part{from: len(s.items), to: len(s.items)} }

func (s *setter) move(p part, dx, dy float64) {
	for i := p.from; i < p.to; i++ {
		s.items[i].X += dx
		s.items[i].Y += dy
	}
}

// join moves b to the right end of a, by gap and dy, and returns both as one.
// The items of b follow those of a.
func (s *setter) join(a, b part, gap, dy float64) part {
	s.move(b, a.width+gap, dy)
	return part{
		width:   a.width + gap + b.width,
		ascent:  max(a.ascent, b.ascent-dy),
		descent: max(a.descent, b.descent+dy),
		from:    a.from, to: b.to,
		lean: b.lean,
	}
}

// swap lists the items of b before those of a, which they follow.
func (s *setter) swap(a, b part) (first, second part) {
	n := b.to - b.from
	var room [32]Item
	moved := append(room[:0], s.items[b.from:b.to]...)
	copy(s.items[a.from+n:], s.items[a.from:a.to])
	copy(s.items[a.from:], moved)
	b.from, b.to = a.from, a.from+n
	a.from, a.to = a.from+n, a.to+n
	return b, a
}

func (s *setter) box(p part) Box {
	return Box{p.width, p.ascent, p.descent, s.items[p.from:p.to:p.to]}
}

// em is the size of the letters in a style.
func (s *setter) em(st style) float64 {
	switch st.level {
	case 0:
		return s.size
	case 1:
		return s.size * float64(s.metrics.ScriptPercent) / 100
	}
	return s.size * float64(s.metrics.ScriptScriptPercent) / 100
}

// scaled is a measure of the face in a style.
func (s *setter) scaled(thousandths int, st style) float64 {
	return float64(thousandths) * s.em(st) / 1000
}

// run sets a text in a face, and a character that the face has not in another.
func (s *setter) run(text string, face *fonts.Face, st style, link string) part {
	if !utf8.ValidString(text) {
		text = strings.ToValidUTF8(text, "\uFFFD")
	}
	text = face.Spell(text)
	p := s.start()
	from := 0
	current := face
	for i, r := range text {
		f := faceFor(r, face)
		if f == current && f != nil {
			continue
		}
		p = s.piece(p, text[from:i], current, st, link)
		from, current = i, f
	}
	return s.piece(p, text[from:], current, st, link)
}

// faceFor is the face to set a character in: the one asked for, else the first
// that has it, else none, as for control characters.
func faceFor(r rune, face *fonts.Face) *fonts.Face {
	if r < ' ' {
		return nil
	}
	if face.Has(r) {
		return face
	}
	for _, f := range [...]*fonts.Face{fonts.Serif, fonts.Sans, fonts.Math} {
		if f.Has(r) {
			return f
		}
	}
	return nil
}

// piece adds a text of one face to a part. Without a face the text is the one
// character that none has; its code is set in its place.
func (s *setter) piece(p part, text string, face *fonts.Face, st style, link string) part {
	if text == "" {
		return p
	}
	if face == nil {
		text, face = code(text), fonts.Sans
	}
	em := s.em(st)
	width, high, low := 0, 0, 0
	lean := 0
	for _, r := range text {
		glyph := face.Glyph(r)
		advance := face.GlyphAdvance(glyph)
		_, y0, x1, y1 := face.Bounds(glyph)
		width += advance
		high, low = max(high, y1), min(low, y0)
		lean = max(0, x1-advance)
	}
	face.Stretches(text, func(t fonts.Stretch) {
		if t.Y != 0 {
			mark, _ := utf8.DecodeRuneInString(t.Text)
			_, y0, _, y1 := face.Bounds(face.Glyph(mark))
			high, low = max(high, y1+t.Y), min(low, y0+t.Y)
		}
	})
	s.items = append(s.items, Item{
		X: p.width, Width: float64(width) * em / 1000,
		Face: face, Size: em, Text: text, Link: link,
	})
	return part{
		width:   p.width + float64(width)*em/1000,
		ascent:  max(p.ascent, float64(high)*em/1000),
		descent: max(p.descent, -float64(low)*em/1000),
		from:    p.from, to: len(s.items),
		lean: float64(lean) * em / 1000,
	}
}

// code stands for a character that no face has.
func code(char string) string {
	const figures = "0123456789ABCDEF"
	var r rune
	for _, r = range char {
		break
	}
	text := []byte("[U+0000]")
	for i := 6; i >= 3; i-- {
		text[i] = figures[r&15]
		r >>= 4
	}
	for ; r > 0; r >>= 4 {
		text = append(text[:3], append([]byte{figures[r&15]}, text[3:]...)...)
	}
	return string(text)
}

// rule adds a filled rectangle to the items.
func (s *setter) rule(x, y, width, height float64) {
	s.items = append(s.items, Item{Kind: Rule, X: x, Y: y, Width: width, Height: height})
}
