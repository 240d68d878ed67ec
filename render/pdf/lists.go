package pdf

import (
	"gusset/notebook"
	"gusset/render"
	"gusset/render/fonts"
	"gusset/render/maths"
)

// lists lays out the closing lists. They keep to the columns of the sheet: the
// number of a check in the reference column, its verdict in the output column.
func (b *prose) lists(l *render.Lists) {
	if len(l.Checks) > 0 {
		b.listHead("Summary of checks")
		for i := range l.Checks {
			b.summary(&l.Checks[i])
		}
	}
	if len(l.Unsourced) > 0 {
		b.listHead("Givens without a source")
		for i := range l.Unsourced {
			b.unsourced(&l.Unsourced[i])
		}
	}
	b.remarks("Assumptions", l.Assumptions)
	b.remarks("Holds", l.Holds)
	if len(l.Symbols) > 0 {
		b.listHead("Symbols")
		b.grid(lineVoice, func(v voice) *grid { return b.doc.symbolsGrid(l.Symbols, v) }, b.doc.tallest())
	}
	if len(l.Sources) > 0 {
		b.listHead("Sources")
		b.grid(lineVoice, func(v voice) *grid { return b.doc.sourcesGrid(l.Sources, v) }, b.doc.tallest())
	}
	b.cautions(l.Cautions)
	if len(l.Notes) > 0 {
		b.listHead("Notes")
		from := len(b.slabs)
		for _, n := range l.Notes {
			p := &paragraph{}
			p.write(noteVoice.style(), n)
			b.space(3)
			b.paragraph(p, noteVoice.leading)
		}
		for i := from; i < len(b.slabs)-1; i++ {
			b.slabs[i].keep = true
		}
	}
}

func (b *prose) listHead(title string) {
	p := &paragraph{}
	p.write(b.sized(2).style(), title)
	b.titled(2, "", title, "", p)
	b.slabs[len(b.slabs)-1].heading.level = 1
	b.space(4)
}

// summary sets a check of the summary. All of it leads to the check.
func (b *prose) summary(s *render.Summary) {
	to := "#" + s.Anchor
	r := b.row()
	note := noteVoice.style()
	note.link = to
	p := &paragraph{}
	p.write(note, s.Note)
	r.paragraph(p, noteVoice.leading)
	r.space(1)
	r.formula(s.Formula, smallSize+0.6, b.doc.tallest())
	for i := range s.Reason {
		r.space(1)
		r.paragraph(b.doc.phrase(&s.Reason[i], noteVoice), noteVoice.leading+1)
	}
	e := render.Entry{Kind: render.Check, Number: s.Number, Mark: s.Mark, Verdict: s.Verdict}
	from := len(b.slabs)
	b.finish(r, &e, 3.2)
	for i := from; i < len(b.slabs); i++ {
		b.slabs[i].bands = nil
		x, width := b.doc.paper.calculation()
		if i == len(b.slabs)-1 {
			b.slabs[i].ink.fill(x, b.slabs[i].height-rowRule, width+calculationPad+outputWidth, rowRule, hairColour)
		}
	}
	k := &b.slabs[from].ink
	k.areas = append(k.areas, area{0, 0, referenceWidth, b.slabs[from].height, to})
}

func (b *prose) unsourced(u *render.Unsourced) {
	p := &paragraph{}
	st := style{face: fonts.Serif, size: smallSize + 0.6, colour: inkColour}
	st.link = "#" + u.Anchor
	if u.Value == nil {
		b.doc.formula(p, u.Symbol, st)
	} else {
		b.doc.formula(p, maths.Row{u.Symbol, maths.Relation("="), u.Value}, st)
	}
	if u.Note != "" {
		p.words[len(p.words)-1].space = 12
		p.open = false
		p.write(noteVoice.style(), u.Note)
	}
	b.space(1.5)
	b.paragraph(p, noteVoice.leading+1.5)
}

func (b *prose) remarks(title string, list []*notebook.Remark) {
	if len(list) == 0 {
		return
	}
	b.listHead(title)
	for _, r := range list {
		b.numbered(r.Number, r.Anchor, r.Text, "")
	}
}

func (b *prose) cautions(list []render.CautionLine) {
	if len(list) == 0 {
		return
	}
	b.listHead("Cautions")
	for _, c := range list {
		helpers := ""
		for i, h := range c.Helpers {
			if i > 0 {
				helpers += ", "
			}
			helpers += h
		}
		b.anchors = append(b.anchors, c.Anchor)
		b.numbered(c.Number, "", c.Text, helpers)
	}
}

// numbered sets a text with its number in the reference column.
func (b *prose) numbered(number, target, words, under string) {
	r := b.row()
	v := lineVoice
	r.words(v, words)
	r.space(1)
	r.words(noteVoice, under)
	e := render.Entry{Refs: []render.Ref{{Text: number, Target: target}}}
	b.finish(r, &e, 2)
}

func (d *document) symbolsGrid(list []render.SymbolLine, v voice) *grid {
	g := &grid{voice: v, wide: 3, head: headings(v, "Symbol", "Unit", "Meaning", "Where")}
	st := style{face: fonts.Serif, size: v.size * 1.15, colour: inkColour}
	for _, s := range list {
		link := st
		link.link = "#" + s.Anchor
		symbol, unit, meaning, where := &paragraph{}, &paragraph{}, &paragraph{}, &paragraph{}
		d.formula(symbol, s.Symbol, link)
		if len(s.Unit) > 0 {
			d.formula(unit, s.Unit, st)
		}
		meaning.write(v.style(), s.Meaning)
		at := v.in(markColour).style()
		at.link = link.link
		where.append(at, s.Where)
		g.rows = append(g.rows, gridRow{cells: []gridCell{{p: symbol}, {p: unit}, {p: meaning}, {p: where, align: right}}})
	}
	return g
}

func (d *document) sourcesGrid(list []render.SourceLine, v voice) *grid {
	g := &grid{voice: v, wide: 2, head: headings(v, "Source", "What rests on it")}
	for _, s := range list {
		source, on := &paragraph{}, &paragraph{}
		source.write(v.style(), s.Source)
		for i, r := range s.On {
			st := style{face: fonts.Serif, size: v.size * 1.15, colour: inkColour, link: "#" + r.Anchor}
			if r.Symbol != nil {
				d.formula(on, r.Symbol, st)
			} else {
				at := v.in(markColour).style()
				at.link = st.link
				on.write(at, r.Number)
			}
			if i < len(s.On)-1 {
				on.write(v.style(), ", ")
			}
		}
		g.rows = append(g.rows, gridRow{cells: []gridCell{{p: source}, {p: on}}})
	}
	return g
}

func headings(v voice, words ...string) gridRow {
	var row gridRow
	for i, w := range words {
		p := &paragraph{}
		p.write(v.strong().in(softColour).style(), w)
		c := gridCell{p: p}
		if w == "Where" && i == len(words)-1 {
			c.align = right
		}
		row.cells = append(row.cells, c)
	}
	return row
}
