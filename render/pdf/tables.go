package pdf

import (
	"math"
	"strconv"

	"gusset/render"
	"gusset/render/fonts"
	"gusset/render/maths"
)

// tabular sets an entry that is nothing but tables, further ones where tables
// stand right above.
func (b *prose) tabular(e *render.Entry, further bool) {
	if e.Note != "" || e.Number != "" || len(e.Refs) > 0 {
		further = false
		r := b.row()
		r.words(noteVoice, e.Note)
		// Two lines of sources stand beside the head of the table.
		b.mayHang = len(e.Tables) > 0 && len(e.Refs) == 1
		b.finish(r, e, entryPad)
		b.mayHang, b.hanging = false, math.Max(0, b.hanging-2*tableVoice.leading)
		b.space(b.hanging)
		b.hanging = 0
		b.keep()
	} else if e.Anchor != "" {
		b.anchors = append(b.anchors, e.Anchor)
	}
	b.tables(e.Tables, e.Number, further)
}

// tables sets the tables of an entry below it, the first kept with it at its
// head. A further one may start a page, and says there which entry it is of.
func (b *prose) tables(list []*render.Table, number string, further bool) {
	for i, t := range list {
		if i == 0 && !further {
			b.keep()
		}
		b.space(3)
		if t.Caption != "" {
			p := &paragraph{}
			p.write(noteVoice.style(), t.Caption)
			caption := len(b.slabs)
			b.paragraph(p, noteVoice.leading)
			if i > 0 && number != "" {
				b.slabs[caption].head = b.goesOn(number)
			}
			b.keep()
			b.space(2)
		}
		b.grid(tableVoice, func(v voice) *grid { return b.doc.rowsGrid(t, v) }, b.doc.tallest())
		if left := t.Left(); left > 0 {
			b.keep()
			p := &paragraph{}
			p.write(noteVoice.style(), leftOut(left, t.Rows))
			b.space(2)
			b.paragraph(p, noteVoice.leading)
		}
		b.space(6)
	}
}

// goesOn is the line at the head of a page that starts with a further table of
// an entry.
func (b *prose) goesOn(number string) *slab {
	p := &paragraph{}
	p.write(noteVoice.style(), "("+number+") continued")
	s := slab{height: noteVoice.leading, baseline: 0.72 * noteVoice.leading}
	p.set(&s.ink, p.lines(b.width)[0], b.x, s.baseline)
	return &s
}

func leftOut(left, rows int) string {
	return strconv.Itoa(left) + " of " + strconv.Itoa(rows) + " rows left out in print"
}

// rowsGrid is a table over rows; the entries that govern are set heavy and
// their rows tinted.
func (d *document) rowsGrid(t *render.Table, v voice) *grid {
	g := &grid{voice: v}
	for i := range t.Heads {
		h := &t.Heads[i]
		st := v.strong().style()
		if h.Anchor != "" {
			g.anchors = append(g.anchors, h.Anchor)
		}
		p := &paragraph{}
		p.write(st, h.Words)
		if h.Symbol != nil {
			p.blank(st)
			symbol := st
			symbol.face = v.regular
			d.formula(p, h.Symbol, symbol)
		}
		if len(h.Unit) > 0 {
			p.blank(st)
			unit := st
			unit.face, unit.colour = v.regular, softColour
			box := maths.Layout(maths.Fence{Open: "[", Body: h.Unit, Close: "]"}, st.size, fonts.Serif)
			p.place(unit, mathsBox(&box, softColour))
		}
		g.head.cells = append(g.head.cells, gridCell{p: p, align: sideOf(h.Right)})
	}
	count := t.Rows
	if t.Printed != nil {
		count = len(t.Printed)
	}
	var cell []byte
	for i := range count {
		n := i
		if t.Printed != nil {
			n = t.Printed[i]
		}
		row := gridRow{tinted: t.Marked(n)}
		for col := range t.Heads {
			st := v.style()
			if t.Governs(n, col) {
				st.face = v.bold
			}
			cell = t.AppendCell(cell[:0], n, col)
			p := &paragraph{}
			p.write(st, string(cell))
			row.cells = append(row.cells, gridCell{p: p, align: sideOf(t.Heads[col].Right)})
		}
		g.rows = append(g.rows, row)
	}
	return g
}

func sideOf(toRight bool) alignment {
	if toRight {
		return right
	}
	return left
}

// trials sets the candidates of `first of` with how each came out.
func (b *prose) trials(list []render.Trial) {
	b.space(2)
	b.grid(lineVoice, func(v voice) *grid {
		g := &grid{voice: v, plain: true, head: headings(v, "tried", "condition", "outcome")}
		for _, t := range list {
			cv, outcome, value := v.in(softColour), "fails", t.Value
			if t.OK {
				cv, outcome = v.strong(), "holds, taken"
			}
			if t.Mark != "" {
				value += " (" + t.Mark + ")"
			}
			var row gridRow
			for _, s := range []string{value, t.Why, outcome} {
				p := &paragraph{}
				p.write(cv.style(), s)
				row.cells = append(row.cells, gridCell{p: p})
			}
			g.rows = append(g.rows, row)
		}
		return g
	}, b.doc.tallest())
	b.space(4)
}
