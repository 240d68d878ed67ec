package pdf

import "gusset/render"

// drawing sets a plot or a figure with its caption.
func (b *prose) drawing(e *render.Entry) {
	r := b.row()
	if d := e.Drawing; d != nil {
		r.drawing(d.Art, b.doc.tallest())
		r.space(4)
		p := &paragraph{}
		p.write(noteVoice.strong().style(), "Figure "+d.Number)
		if d.Caption != "" {
			p.blank(noteVoice.style())
			p.write(noteVoice.style(), d.Caption)
		}
		r.paragraph(p, noteVoice.leading)
	}
	b.finish(r, e, entryPad)
}
