package pdf

import (
	"math"
	"strings"

	"gusset/render"
	"gusset/render/fonts"
	"gusset/render/maths"
)

// The distances of entries.
const (
	entryPad    = 3.4 // above and below what stands in a row
	bandPad     = 4.5 // the same on a band
	bandGap     = 1.5 // between bands
	notesAt     = 36 * mm
	entryIndent = 14.0
	groupGap    = 9.0
	helperGap   = 5.0 // below the lines of a helper
	lineGap     = 3.0 // between the lines of a formula
)

// entries lays out a block of calculation.
func (b *prose) entries(index int) {
	list := b.doc.page.Blocks[index]
	b.space(blockGap - entryPad)
	for i := 0; i < len(list); i++ {
		if i > 0 && list[i].Indent < list[i-1].Indent {
			b.space(helperGap)
		}
		if list[i].Kind == render.Line {
			n := i + 1
			for n < len(list) && list[n].Kind == render.Line && list[n].Indent == list[i].Indent {
				n++
			}
			b.lines(list[i:n])
			i = n - 1
		} else {
			b.mayHang = i+1 < len(list) && mayHang(&list[i]) && takesHanging(&list[i+1])
			b.entry(&list[i], i > 0 && list[i-1].Kind == render.Tabular)
		}
		if i+1 < len(list) && list[i+1].Indent > list[i].Indent {
			b.keep() // a call stands with the first of the lines that it leads to
		}
	}
	b.space(blockGap - entryPad)
}

// mayHang reports whether the references of an entry may hang down beside the
// next one.
func mayHang(e *render.Entry) bool {
	return e.Kind != render.Check && len(e.Tables) == 0 && len(e.Trials) == 0
}

// takesHanging reports whether the reference column beside an entry is free
// for what hangs down from the entry above.
func takesHanging(e *render.Entry) bool {
	switch e.Kind {
	case render.Limit, render.Formula, render.Line:
		return e.Number == "" && len(e.Refs) == 0
	}
	return false
}

// indented runs a function with the column moved in by the entry's steps, with
// a rule beside it inside a helper.
func (b *prose) indented(e *render.Entry, run func()) {
	if e.Indent == 0 {
		run()
		return
	}
	by := entryIndent * float64(e.Indent)
	b.inset(by, band{x: b.x + math.Min(by, b.width-leastColumn) - 8, width: 0.6, colour: hairColour}, run)
}

// entry lays out an entry; further tells that tables stand right above it.
func (b *prose) entry(e *render.Entry, further bool) {
	switch e.Kind {
	case render.Gap:
		b.space(groupGap)
	case render.NoteLine:
		b.indented(e, func() { b.noteLine(e) })
	case render.HelperHead:
		b.indented(e, func() { b.helperHead(e) })
	case render.Tabular:
		b.indented(e, func() { b.tabular(e, further) })
	case render.DrawingOf:
		b.indented(e, func() { b.drawing(e) })
	case render.Limit:
		b.indented(e, func() { b.limit(e) })
	default:
		b.indented(e, func() { b.formulaEntry(e) })
	}
}

// row is an entry in the making: the parts of its calculation from top to
// bottom, and the part whose baseline the output stands on.
type row struct {
	*flow
	output int
}

func (b *prose) row() *row { return &row{flow: &flow{x: b.x, width: b.width}} }

// words pushes a text.
func (r *row) words(v voice, s string) {
	if s != "" {
		p := &paragraph{}
		p.write(v.style(), s)
		r.paragraph(p, v.leading)
	}
}

// formula pushes the lines of a formula, and makes the last of them the one
// that the output stands beside.
func (r *row) formula(c maths.Chain, size float64, tallest float64) {
	if c.Left == nil && len(c.Steps) == 0 {
		return
	}
	lines := maths.Break(c, size, r.width)
	above := 0.0
	for i := range lines {
		b := mathsBox(&lines[i], inkColour)
		if b.ascent+b.descent > tallest {
			b = b.scaled(tallest / (b.ascent + b.descent))
		}
		ascent, descent := math.Max(b.ascent, 0.75*size), math.Max(b.descent, 0.25*size)
		s := slab{height: ascent + descent, baseline: ascent}
		s.ink.add(&b.ink, r.x, ascent)
		if i > 0 {
			// Fractions need more to stay clear of each other than text does.
			tall := math.Max(0, above+ascent-1.2*size)
			r.space(lineGap + math.Min(0.3*tall, lineGap))
		}
		above = descent
		r.push(s)
		r.output = len(r.slabs) - 1
	}
}

// formulaEntry lays out a formula, a check or a definition: the note above,
// the formula, what is said below it; and its output beside the last line.
func (b *prose) formulaEntry(e *render.Entry) {
	r := b.row()
	r.words(noteVoice, e.Note)
	r.space(2.5)
	r.formula(e.Formula, formulaSize, b.doc.tallest())
	for i := range e.Below {
		r.space(lineGap)
		r.paragraph(b.doc.phrase(&e.Below[i], noteVoice), noteVoice.leading+1)
	}
	pad := entryPad
	if e.Kind == render.Check {
		pad = bandPad
		b.space(bandGap)
	}
	b.finish(r, e, pad)
	if len(e.Trials) > 0 {
		b.keep()
		b.trials(e.Trials)
	}
	b.tables(e.Tables, e.Number, false)
}

// phrase is a formula in a sentence.
func (d *document) phrase(f *render.Phrase, v voice) *paragraph {
	p := &paragraph{}
	st := v.style()
	p.write(st, f.Before)
	if f.Before != "" && (f.Formula.Left != nil || len(f.Formula.Steps) > 0) {
		p.blank(st)
	}
	inner := st
	inner.size = smallSize
	inner.face = fonts.Serif
	d.chain(p, f.Formula, inner)
	if f.After != "" {
		if p.open && !isPunctuation(f.After) {
			p.blank(st)
		}
		p.write(st, f.After)
	}
	return p
}

func isPunctuation(s string) bool {
	return s[0] == ',' || s[0] == '.' || s[0] == ';' || s[0] == ':' || s[0] == ')' || s[0] == ' '
}

// finish puts the reference and output columns beside the parts of an entry
// and pushes it, all parts kept together.
func (b *prose) finish(r *row, e *render.Entry, pad float64) {
	if len(r.slabs) == 0 {
		r.push(slab{height: noteVoice.leading, baseline: 0.72 * noteVoice.leading})
	}
	parts := r.slabs
	parts[0].gap = 0
	parts[0].pad, parts[0].height, parts[0].baseline = pad, parts[0].height+pad, parts[0].baseline+pad
	parts[len(parts)-1].height += pad
	lack := math.Max(b.references(parts, e), b.hanging) - height(parts)
	b.hanging = 0
	hangs := lack > 0 && b.mayHang
	if hangs {
		b.hanging = lack
	} else if lack > 0 {
		parts[len(parts)-1].height += lack
	}
	if e.Kind == render.Check {
		b.verdictBeside(parts, e)
	} else {
		b.outputBeside(parts, min(r.output, len(parts)-1), e)
	}
	if e.Anchor != "" {
		b.anchors = append(b.anchors, e.Anchor)
	}
	for i := range parts {
		parts[i].keep = i < len(parts)-1 || hangs
		if e.Kind == render.Check {
			x, width := b.doc.paper.calculation()
			parts[i].bands = []band{{
				x: x - calculationPad, width: width + 2*calculationPad + outputWidth,
				colour: washColour, starts: i == 0,
			}}
		}
		b.push(parts[i])
	}
}

// references sets the number and the sources flush right in their column,
// from the first baseline down, and returns how far down they go.
func (b *prose) references(parts []slab, e *render.Entry) float64 {
	const leading = 10.4
	pad := parts[0].pad
	y := parts[0].baseline - pad
	k := &ink{}
	width := referenceWidth - referencePad
	if e.Number != "" {
		st := style{face: fonts.Sans, size: 7.6, colour: softColour}
		s := "(" + e.Number + ")"
		k.texts = append(k.texts, text{x: width - st.width(s), y: y, style: st, text: s})
		y += leading
	}
	for _, ref := range e.Refs {
		st := style{face: fonts.Sans, size: 7.6, colour: markColour}
		if ref.Target != "" {
			st.link = "#" + ref.Target
		}
		p := &paragraph{}
		p.write(st, ref.Text)
		for i := range p.words {
			if p.words[i].cost == numberCost {
				p.words[i].cost = tableCost
			}
		}
		// A source that is longer stands whole in the list of sources.
		p, lines := p.few(width, 12)
		for _, l := range lines {
			p.set(k, l, width-l.width, y)
			y += leading
		}
	}
	// References are read first.
	own := &parts[0].ink
	own.texts = append(k.texts, own.texts...)
	own.areas = append(own.areas, k.areas...)
	return pad + y - leading + 4
}

// outputBeside sets a value in the output column on the baseline of a part,
// and its mark below, beside the parts that follow.
func (b *prose) outputBeside(parts []slab, at int, e *render.Entry) {
	x, width := b.doc.paper.output()
	s := &parts[at]
	y := s.baseline - s.pad
	if e.Output != nil {
		p, lines := b.doc.outputWords(e.Output, width).few(width, 20)
		for i, l := range lines {
			p.set(&s.ink, l, x, y+float64(i)*outputLeading)
		}
		y += float64(len(lines)-1) * outputLeading
	}
	if v := e.Verdict; v != nil {
		st := style{face: fonts.SansSemiBold, size: 8.2, colour: okColour}
		if !v.OK {
			st.colour = ngColour
		}
		s.ink.texts = append(s.ink.texts, text{x: x, y: y, style: st, text: v.Word})
	}
	if e.Mark != "" {
		if e.Output != nil || e.Verdict != nil {
			y += 10
		}
		y = b.doc.smallOutput(s, e.Mark, y)
	}
	low := s.pad + y + 5
	if height(parts) > b.doc.tallest() {
		// The parts may stand on several pages.
		s.height = math.Max(s.height, low)
	} else if lack := low - height(parts[at:]); lack > 0 {
		parts[len(parts)-1].height += lack
	}
}

const outputLeading = 13.0

// outputStyle is how results are set: heavy, so that an eye can run down them.
var outputStyle = style{face: fonts.SansSemiBold, size: 9.6, colour: inkColour}

// outputWords is a result as a paragraph of its column.
func (d *document) outputWords(n maths.Node, width float64) *paragraph {
	p := &paragraph{}
	if t, ok := n.(maths.Text); ok {
		p.write(outputStyle, t.Text)
		return p
	}
	m := maths.Layout(n, outputStyle.size, fonts.SansSemiBold)
	if m.Width > width {
		plain := string(maths.AppendPlain(nil, n))
		number, ok := n.(maths.Number)
		if !ok || len(number.Unit) == 0 || !strings.Contains(plain, "^") && outputStyle.width(plain) <= width {
			p.write(outputStyle, plain)
			return p
		}
		// Too long for a line, the figures stand above their unit.
		unit := maths.Layout(number.Unit, outputStyle.size, fonts.SansSemiBold)
		number.Unit = nil
		m = maths.Layout(number, outputStyle.size, fonts.SansSemiBold)
		p.place(outputStyle, mathsBox(&m, inkColour))
		p.blank(outputStyle)
		p.place(outputStyle, mathsBox(&unit, inkColour))
		return p
	}
	p.place(outputStyle, mathsBox(&m, inkColour))
	return p
}

// smallOutput sets a small text in the output column and returns the lowest
// baseline.
func (d *document) smallOutput(s *slab, words string, y float64) float64 {
	x, width := d.paper.output()
	st := style{face: fonts.Sans, size: 7.6, colour: softColour}
	p := &paragraph{}
	p.write(st, words)
	p, lines := p.few(width, 6)
	for i, l := range lines {
		if i > 0 {
			y += 9.6
		}
		p.set(&s.ink, l, x, y)
	}
	return y
}
