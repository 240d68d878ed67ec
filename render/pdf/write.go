// Package pdf writes a page to a PDF.
//
// A document becomes paper in three steps. The blocks of the prose and the
// entries between them become slabs, which never break, each with its ink in
// the three columns of the sheet; running text is broken into lines by total
// fit. Slabs are put on pages, what belongs together staying so. Then the pages
// are drawn, when it is known how many there are.
package pdf

import (
	"time"

	"gusset/render"
)

// Write returns the page as a PDF, dated by the calc, else by the date given,
// and by a fixed one where that is zero. The same page gives the same bytes.
func Write(p *render.Page, date time.Time) ([]byte, error) {
	return newDocument(p).layout().write(date)
}

// fixedDate dates a document that has no date of its own.
var fixedDate = time.Date(2000, 1, 1, 0, 0, 0, 0, time.UTC)

func (l *layout) write(date time.Time) ([]byte, error) {
	c := l.canvas
	l.properties(c, date)
	l.album.register(c.pdf)
	marks := l.placesOf(c)
	for i, page := range l.pages {
		c.pdf.AddPage()
		l.bands(c, page)
		l.furniture(c, i)
		for j := range page {
			c.draw(&page[j].ink, sideMargin, page[j].y+page[j].pad)
			marks.annotate(c, &page[j].ink, sideMargin, page[j].y+page[j].pad)
			if h := page[j].heading; h != nil && !page[j].repeat {
				marks.bookmark(c, h, page[j].y)
			}
			if !page[j].repeat {
				page[j].ink = ink{} // what is drawn need not be held
			}
		}
		if i == 0 {
			marks.annotate(c, &l.title.ink, sideMargin, topMargin)
		}
	}
	var out squeezer
	if err := c.pdf.Output(&out); err != nil {
		return nil, err
	}
	return out.file, nil
}

// properties sets the title, the author, the subject and the dates.
func (l *layout) properties(c *canvas, date time.Time) {
	f := &l.page.Sheet.Front
	title := f.Calc
	if f.Rev != "" {
		title += " rev " + f.Rev
	}
	if l.page.Title.Title != f.Calc {
		title += " " + l.page.Title.Title
	}
	c.pdf.SetTitle(bookmark(title), true)
	c.pdf.SetAuthor(bookmark(f.By.Name), true)
	c.pdf.SetSubject(bookmark(f.Project), true)
	c.pdf.SetProducer("gusset", true)
	if own, err := time.Parse(time.DateOnly, f.Date); err == nil {
		date = own
	}
	if date.IsZero() {
		date = fixedDate
	}
	c.pdf.SetCreationDate(date.UTC())
	c.pdf.SetModificationDate(date.UTC())
}

// bands draws the stripes of a page, which lie under all else.
func (l *layout) bands(c *canvas, page []placed) {
	for _, s := range page {
		for _, b := range s.bands {
			y, h := s.y, s.height
			if !b.starts && !s.opens {
				y, h = y-s.gap, h+s.gap
			}
			c.fill(sideMargin+b.x, y, b.width, h, b.colour)
		}
	}
}
