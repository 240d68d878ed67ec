package html

import (
	"encoding/base64"
	"strconv"

	"gusset/render"
)

func (w *writer) titleBlock() {
	t := &w.page.Title
	w.raw(`<div class="block"><div class="name">`)
	if t.Firm != "" || w.sheet.Images[t.Logo] != nil {
		w.raw(`<div class="firm">`)
		if img := w.sheet.Images[t.Logo]; img != nil {
			w.image(t.Logo, t.Firm, "", "logo")
		}
		if t.Firm != "" {
			w.raw("<span>")
			w.text(t.Firm)
			w.raw("</span>")
		}
		w.raw("</div>")
	}
	w.raw("<h1>")
	w.names(t.Title)
	w.raw("</h1>")
	if t.Under != "" {
		w.raw("<p>")
		w.text(t.Under)
		w.raw("</p>")
	}
	w.raw("</div>\n<dl>")
	for i, c := range t.Cells {
		if i == len(t.Cells)-1 {
			c.Label, c.Text = "Issue", "Working copy"
		}
		w.raw("<div><dt>")
		w.text(c.Label)
		w.raw("</dt><dd>")
		w.text(c.Text)
		if c.Date != "" {
			w.raw(` <span>`)
			w.text(c.Date)
			w.raw("</span>")
		}
		w.raw("</dd></div>")
	}
	w.raw("</dl></div>\n")
}

// image writes an image of the root with its data inside.
func (w *writer) image(path, alternative, title, class string) {
	img := w.sheet.Images[path]
	w.raw(`<img`)
	if class != "" {
		w.raw(` class="`)
		w.raw(class)
		w.raw(`"`)
	}
	w.raw(` width="`)
	w.int(img.Width)
	w.raw(`" height="`)
	w.int(img.Height)
	w.raw(`" alt="`)
	w.text(alternative)
	if title != "" {
		w.raw(`" title="`)
		w.text(title)
	}
	w.raw(`" src="data:image/`)
	w.raw(img.Format)
	w.raw(";base64,")
	w.b = base64.StdEncoding.AppendEncode(w.b, img.Data)
	w.raw(`">`)
}

func (w *writer) int(n int) { w.b = strconv.AppendInt(w.b, int64(n), 10) }

// stateBox says how the calc stands.
func (w *writer) stateBox() {
	s := &w.page.State
	w.raw(`<ul class="state">`)
	w.count(s.Checks, "check", "checks", "")
	if s.NG > 0 {
		w.count(s.NG, "NG", "NG", "ng")
	} else if s.Checks > 0 {
		w.count(0, "NG", "NG", "")
	}
	if s.NotRequired > 0 {
		w.count(s.NotRequired, "not required", "not required", "")
	}
	if s.Worst != nil {
		w.raw(`<li>worst <b>`)
		w.figures(s.Worst.Verdict.Utilisation)
		w.raw("</b> ")
		w.jump(s.Worst.Anchor, "("+s.Worst.Number+")")
		w.raw("</li>")
	}
	w.count(s.Holds, "hold", "holds", "")
	w.count(s.Assumptions, "assumption", "assumptions", "")
	w.raw("</ul>\n")
}

func (w *writer) count(n int, one, many, class string) {
	word := many
	if n == 1 {
		word = one
	}
	w.raw("<li")
	if class != "" {
		w.raw(` class="`)
		w.raw(class)
		w.raw(`"`)
	}
	w.raw("><b>")
	w.int(n)
	w.raw("</b> ")
	w.raw(word)
	w.raw("</li>")
}

// jump writes a link to a place on the page, or the words alone.
func (w *writer) jump(anchor, words string) {
	if anchor == "" {
		w.names(words)
		return
	}
	w.raw(`<a href="#`)
	w.text(anchor)
	w.raw(`">`)
	w.names(words)
	w.raw("</a>")
}

// paper writes the rules for the paper that the calc is printed on.
func (w *writer) paper(p *render.Page) {
	size, width := "A4", "210mm"
	if p.Title.Paper == "Letter" {
		size, width = "letter", "8.5in"
	}
	w.raw("@page{size:" + size + ";margin:12mm 12mm 16mm}\n")
	f := &p.Sheet.Front
	strip := f.Calc
	if f.Rev != "" {
		strip += " rev " + f.Rev
	}
	w.raw(`@page{@bottom-left{content:"`)
	w.cssString(strip + " · working copy")
	w.raw(`";font:7.5pt "Plex Sans",sans-serif;color:#5b6876}@bottom-right{content:"Sheet " counter(page) " of " counter(pages);font:7.5pt "Plex Sans",sans-serif;color:#5b6876}}` + "\n")
	w.raw("@media screen{.sheet{max-width:" + width + "}}\n")
}

// cssString writes text inside a string of a style sheet: all but letters,
// figures and blanks as their code points.
func (w *writer) cssString(s string) {
	for _, r := range s {
		if r == ' ' || r >= '0' && r <= '9' || r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' {
			w.b = append(w.b, byte(r))
			continue
		}
		w.raw(`\`)
		w.b = strconv.AppendInt(w.b, int64(r), 16)
		w.raw(" ")
	}
}
