package pdf

import "strings"

// places are the links of a document that is being drawn: where its anchors
// stand, and the library's numbers of those that something leads to.
type places struct {
	at    map[string]place
	links map[string]int
	level int // of the last bookmark
}

type place struct {
	page int // from 1
	y    float64
}

// placesOf finds the anchors of all pages.
func (l *layout) placesOf(c *canvas) *places {
	m := &places{at: map[string]place{}, links: map[string]int{}, level: -1}
	for i, page := range l.pages {
		for j := range page {
			for _, a := range page[j].anchors {
				if _, ok := m.at[a]; !ok && !page[j].repeat {
					m.at[a] = place{i + 1, page[j].y}
				}
			}
		}
	}
	return m
}

// annotate puts the links of some ink on the page. One that leads nowhere in
// the document is left out.
func (m *places) annotate(c *canvas, k *ink, x, y float64) {
	for _, a := range k.areas {
		m.link(c, a.link, x+a.x, y+a.y, a.w, a.h)
	}
	for i := range k.texts {
		f := &k.texts[i]
		for j := range f.items {
			if t := &f.items[j]; t.Link != "" {
				size := t.Size * f.scale
				m.jump(c, t.Link, x+f.x+t.X*f.scale, y+f.y+t.Y*f.scale-0.8*size, t.Width*f.scale, 1.05*size)
			}
		}
	}
}

func (m *places) link(c *canvas, to string, x, y, w, h float64) {
	if id, internal := strings.CutPrefix(to, "#"); internal {
		m.jump(c, id, x, y, w, h)
	} else {
		c.pdf.LinkString(x, y, w, h, to)
	}
}

// jump puts a link to an anchor on the page.
func (m *places) jump(c *canvas, id string, x, y, w, h float64) {
	to, ok := m.at[id]
	if !ok {
		return
	}
	n, ok := m.links[id]
	if !ok {
		n = c.pdf.AddLink()
		c.pdf.SetLink(n, max(to.y-6, 0), to.page)
		m.links[id] = n
	}
	c.pdf.Link(x, y, w, h, n)
}

// bookmark adds a heading to the outline. A reader takes levels that grow one
// by one only.
func (m *places) bookmark(c *canvas, h *heading, y float64) {
	m.level = min(h.level-1, m.level+1)
	m.level = max(m.level, 0)
	title := bookmark(h.text)
	if title == "" {
		title = "–"
	}
	c.pdf.Bookmark(title, m.level, max(y-6, 0))
}
