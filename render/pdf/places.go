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
		id, internal := strings.CutPrefix(a.link, "#")
		if !internal {
			c.pdf.LinkString(x+a.x, y+a.y, a.w, a.h, a.link)
			continue
		}
		to, ok := m.at[id]
		if !ok {
			continue
		}
		n, ok := m.links[id]
		if !ok {
			n = c.pdf.AddLink()
			c.pdf.SetLink(n, max(to.y-6, 0), to.page)
			m.links[id] = n
		}
		c.pdf.Link(x+a.x, y+a.y, a.w, a.h, n)
	}
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
