package pdf

import (
	"math"

	"gusset/render"
	"gusset/render/fonts"
	"gusset/render/maths"
)

// lines lays out givens and other one-line values that follow each other: the
// names, the values from their equals signs on, and the notes each stand in a
// column of their own.
func (b *prose) lines(list []render.Entry) {
	b.indented(&list[0], func() {
		c := columnsOf(list, b.width)
		for i := range list {
			b.mayHang = i+1 < len(list) && mayHang(&list[i]) && takesHanging(&list[i+1])
			b.line(&list[i], &c.lines[i], c)
			if i == 0 && len(list) > 1 || i == len(list)-2 {
				b.keep() // no page begins or ends with a single one of them
			}
		}
	})
}

// lineColumns are the places of the columns of a group of lines.
type lineColumns struct {
	values, notes float64
	lines         []lineParts
}

// longNote is the length from which on a note stands below its line, where it
// has more room.
const longNote = 240

// lineParts is a line set in two boxes; whole tells that it cannot be, and
// goes over the full width with its note below.
type lineParts struct {
	name, value maths.Box
	whole       bool
}

func columnsOf(list []render.Entry, width float64) lineColumns {
	const widestName, widestLine = 0.3, 0.58 // of the column
	c := lineColumns{lines: make([]lineParts, len(list))}
	space := 5.0 / 18 * formulaSize
	for i := range list {
		f, l := list[i].Formula, &c.lines[i]
		if l.whole = f.Left == nil || len(f.Steps) > 1; l.whole {
			continue
		}
		l.name = maths.Layout(f.Left, formulaSize, fonts.Serif)
		if len(f.Steps) == 0 {
			// The value stands in the output column.
			l.value = maths.Layout(nil, formulaSize, fonts.Serif)
		} else {
			l.value = maths.Layout(maths.Row{maths.Relation(f.Steps[0].Sign), f.Steps[0].Right}, formulaSize, fonts.Serif)
		}
		if l.whole = l.name.Width > widestName*width; !l.whole {
			c.values = math.Max(c.values, l.name.Width+space)
		}
	}
	for i := range c.lines {
		l := &c.lines[i]
		if l.whole = l.whole || len(list[i].Note) > longNote; l.whole {
			continue
		}
		end := c.values + l.value.Width
		if l.whole = end > widestLine*width; !l.whole {
			c.notes = math.Max(c.notes, end+14)
		}
	}
	c.notes = math.Max(c.notes, math.Min(notesAt, 0.4*width))
	return c
}

func (b *prose) line(e *render.Entry, l *lineParts, c lineColumns) {
	r := b.row()
	if l.whole {
		r.formula(e.Formula, formulaSize, b.doc.tallest())
		r.space(1)
		r.words(noteVoice, e.Note)
	} else {
		b.sideBySide(r, e.Note, l, c)
	}
	for i := range e.Below {
		r.space(1)
		r.paragraph(b.doc.phrase(&e.Below[i], noteVoice), noteVoice.leading+1)
	}
	b.finish(r, e, entryPad)
	b.tables(e.Tables, e.Number, false)
}

// sideBySide sets a line in the columns of its group.
func (b *prose) sideBySide(r *row, note string, l *lineParts, c lineColumns) {
	ascent := math.Max(0.75*formulaSize, math.Max(l.name.Ascent, l.value.Ascent))
	descent := math.Max(0.25*formulaSize, math.Max(l.name.Descent, l.value.Descent))
	s := slab{height: ascent + descent, baseline: ascent}
	s.ink.add(&mathsBox(&l.name, inkColour).ink, r.x, ascent)
	s.ink.add(&mathsBox(&l.value, inkColour).ink, r.x+c.values, ascent)
	p := &paragraph{}
	p.write(noteVoice.style(), note)
	width := r.width - c.notes
	p = p.fitted(width)
	y := ascent
	for _, n := range p.lines(width) {
		p.set(&s.ink, n, r.x+c.notes, y)
		s.height = math.Max(s.height, y+0.25*noteVoice.leading)
		y += noteVoice.leading
	}
	r.push(s)
}

// noteLine sets a line that is only a note: it heads the lines that follow.
func (b *prose) noteLine(e *render.Entry) {
	r := b.row()
	r.words(noteVoice.strong(), e.Note)
	b.space(4)
	b.finish(r, e, 1.5)
	b.keep()
}

// helperHead sets the head of a helper's lines: its title, and its arguments
// or signature.
func (b *prose) helperHead(e *render.Entry) {
	r := b.row()
	r.words(noteVoice.strong().in(inkColour), e.Note)
	r.space(1.5)
	r.formula(e.Formula, smallSize+0.5, b.doc.tallest())
	for i := range e.Below {
		r.space(1.5)
		r.paragraph(b.doc.phrase(&e.Below[i], noteVoice), noteVoice.leading+1)
	}
	b.space(3)
	b.finish(r, e, entryPad)
	b.keep()
}

// noteSpace is the room between a limit and what it says.
const noteSpace = 10.0

// limit sets a limit of validity: small, with what it says behind it, or
// below it where the line has no room.
func (b *prose) limit(e *render.Entry) {
	r := b.row()
	p := &paragraph{}
	st := noteVoice.in(inkColour).style()
	st.face, st.size = fonts.Serif, smallSize+0.5
	b.doc.chain(p, e.Formula, st)
	note := &paragraph{}
	note.write(noteVoice.style(), e.Note)
	long, _ := p.natural()
	behind, _ := note.natural()
	if len(p.words) > 0 && long+noteSpace+behind <= r.width {
		p.words[len(p.words)-1].space = noteSpace
		note = p.followed(note)
	} else {
		r.paragraph(p, noteVoice.leading+1)
	}
	r.paragraph(note, noteVoice.leading+1)
	for i := range e.Below {
		r.space(1)
		r.paragraph(b.doc.phrase(&e.Below[i], noteVoice), noteVoice.leading+1)
	}
	b.finish(r, e, 1.8)
}
