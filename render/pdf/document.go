package pdf

import "gusset/render"

// document is a page of results on its way to paper.
type document struct {
	page   *render.Page
	source []byte // that the segments of the prose point into
	paper  paper
	album  *album
	canvas *canvas // what it is drawn on
}

// layout is a document laid out: the sheets with what stands on them.
type layout struct {
	*document
	title titleBlock
	pages [][]placed
}

func newDocument(p *render.Page) *document {
	return &document{
		page:   p,
		source: p.Sheet.Source.Text,
		paper:  paperOf(p.Title.Paper),
		album:  &album{files: p.Sheet.Images, ready: map[string]*image{}},
		canvas: newCanvas(paperOf(p.Title.Paper)),
	}
}

// widest is the width of the calculation column's text.
func (d *document) widest() float64 {
	_, width := d.paper.calculation()
	return width
}

// tallest is the height beyond which a thing is made smaller or broken, so
// that what belongs to it still finds room on a page.
func (d *document) tallest() float64 { return 0.6 * d.paper.height }

func (d *document) layout() *layout {
	x, width := d.paper.calculation()
	faces := d.canvas.expect()
	defer faces.wait()
	b := &prose{flow: &flow{x: x, width: width, pushed: faces.in, slabs: make([]slab, 0, len(d.source)/64)}, doc: d, voice: proseVoice}
	if d.page.Sheet.Doc != nil {
		b.children(d.page.Sheet.Doc)
	}
	b.lists(&d.page.Lists)
	t := d.titleBlock()
	l := &layout{document: d, title: t}
	l.pages = paginate(b.slabs, t.height+columnHeadHeight, topMargin+stripHeight+columnHeadHeight, d.paper.foot())
	return l
}
