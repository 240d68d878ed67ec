package pdf

import (
	"gusset/render/fonts"
	"gusset/render/maths"
)

// The sizes of formulas: on lines of their own, and in the small lines below.
const (
	formulaSize = 11.0
	smallSize   = 9.0
)

// mathsBox makes a box of a formula that was set for paper.
func mathsBox(m *maths.Box, c colour) *box {
	b := &box{width: m.Width, ascent: m.Ascent, descent: m.Descent}
	if len(m.Items) > 0 { // a formula may be nothing but space
		b.ink.texts = []text{{scale: 1, items: m.Items, style: style{colour: c}}}
	}
	return b
}

// besideFace is the face of figures and units beside a text.
func besideFace(st style) *fonts.Face {
	switch st.face {
	case fonts.Sans, fonts.SansSemiBold, fonts.SerifSemiBold:
		return st.face
	case fonts.SerifSemiBoldItalic:
		return fonts.SerifSemiBold
	}
	return fonts.Serif
}

// formula puts a formula into running text, which may break between its
// parts. A part that is wider than any line is written as words.
func (d *document) formula(p *paragraph, n maths.Node, st style) {
	if t, ok := n.(maths.Text); ok {
		p.write(st, t.Text)
		return
	}
	face := besideFace(st)
	fits := func(n maths.Node) bool { return maths.Layout(n, st.size, face).Width <= d.widest() }
	for i, part := range maths.Parts(n, fits) {
		if i > 0 && p.open {
			p.words[len(p.words)-1].space = part.Gap * st.size
			p.open = false
		}
		m := maths.Layout(part.Node, st.size, face)
		if m.Width > d.widest() {
			p.write(st, string(maths.AppendPlain(nil, part.Node)))
			continue
		}
		p.place(st, mathsBox(&m, st.colour))
	}
}

// chain puts a chain of relations into running text, which may break before
// each of them.
func (d *document) chain(p *paragraph, c maths.Chain, st style) {
	space := 5.0 / 18 * st.size
	if c.Left != nil {
		d.formula(p, c.Left, st)
	}
	for _, step := range c.Steps {
		if p.open {
			p.words[len(p.words)-1].space = space
			p.open = false
		}
		d.formula(p, maths.Row{maths.Relation(step.Sign), step.Right}, st)
	}
}
