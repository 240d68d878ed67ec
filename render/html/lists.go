package html

import (
	"gusset/notebook"
	"gusset/render"
	"gusset/render/maths"
)

// lists writes the closing lists. One that is empty is not there.
func (w *writer) lists() {
	l := &w.page.Lists
	w.raw(`<footer class="lists">` + "\n")
	w.summary(l.Checks)
	w.unsourced(l.Unsourced)
	w.remarkList("Assumptions", l.Assumptions)
	w.remarkList("Holds", l.Holds)
	w.symbols(l.Symbols)
	w.sources(l.Sources)
	w.cautions(l.Cautions)
	w.listHead("Notes")
	w.raw(`<div class="row"><div class="mid notes">`)
	for _, n := range l.Notes {
		w.raw("<p>")
		w.text(n)
		w.raw("</p>")
	}
	w.raw("</div></div>\n</footer>\n")
}

func (w *writer) listHead(title string) {
	w.raw(`<div class="row head"><div class="mid"><h2>`)
	w.text(title)
	w.raw("</h2></div></div>\n")
}

// listRef starts a row of a list with its reference column.
func (w *writer) listRef(class, anchor, words string) {
	w.raw(`<div class="row e list `)
	w.raw(class)
	w.raw(`"><div class="ref"><span class="n">`)
	w.jump(anchor, words)
	w.raw(`</span></div>`)
}

func (w *writer) note(s string) {
	if s != "" {
		w.raw(`<div class="note">`)
		w.names(measured(s))
		w.raw("</div>")
	}
}

func (w *writer) summary(list []render.Summary) {
	if len(list) == 0 {
		return
	}
	w.listHead("Summary of checks")
	for i := range list {
		s := &list[i]
		w.listRef("check", s.Anchor, "("+s.Number+")")
		w.note(s.Note)
		w.raw(`<div class="eq">`)
		w.b = maths.AppendChain(w.b, s.Formula, w.column(0, summarySize))
		w.raw("</div>")
		if len(s.Reason) > 0 {
			w.raw(`<div class="more">`)
			for j := range s.Reason {
				w.phrase(&s.Reason[j], 0)
			}
			w.raw("</div>")
		}
		w.raw(`<div class="out">`)
		w.verdict(s.Verdict)
		if s.Mark != "" {
			w.raw(`<span class="mark">`)
			w.text(s.Mark)
			w.raw("</span>")
		}
		w.raw("</div></div>\n")
	}
}

func (w *writer) unsourced(list []render.Unsourced) {
	if len(list) == 0 {
		return
	}
	w.listHead("Givens without a source")
	for i := range list {
		u := &list[i]
		w.raw(`<div class="row e list line">`)
		w.note(u.Note)
		w.raw(`<div class="eq"><a href="#`)
		w.text(u.Anchor)
		w.raw(`">`)
		switch value := u.Value.(type) {
		case nil:
			w.symbol(u.Symbol)
		case maths.Text: // in the line, where it may wrap
			w.symbol(u.Symbol)
			w.raw(" = ")
			w.text(value.Text)
		default:
			w.symbol(maths.Row{u.Symbol, maths.Relation("="), value})
		}
		w.raw("</a></div></div>\n")
	}
}

func (w *writer) remarkList(title string, list []*notebook.Remark) {
	if len(list) == 0 {
		return
	}
	w.listHead(title)
	for _, r := range list {
		w.listRef("", r.Anchor, r.Number)
		w.raw(`<div class="more"><p>`)
		w.figures(measured(r.Text))
		w.raw("</p></div></div>\n")
	}
}

func (w *writer) symbols(list []render.SymbolLine) {
	if len(list) == 0 {
		return
	}
	w.listHead("Symbols")
	for i := range list {
		s := &list[i]
		w.listRef("line", s.Anchor, s.Where)
		w.note(s.Meaning)
		w.raw(`<div class="eq">`)
		w.symbol(s.Symbol)
		w.raw("</div>")
		if len(s.Unit) > 0 {
			w.raw(`<div class="out"><span class="unit">`)
			w.unit(s.Unit)
			w.raw("</span></div>")
		}
		w.raw("</div>\n")
	}
}

func (w *writer) sources(list []render.SourceLine) {
	if len(list) == 0 {
		return
	}
	w.listHead("Sources")
	for i := range list {
		s := &list[i]
		w.raw(`<div class="row e list"><div class="more"><p>`)
		w.names(measured(s.Source))
		w.raw(`</p><div class="rest">`)
		for j := range s.On {
			on := &s.On[j]
			if j > 0 {
				w.raw(", ")
			}
			if on.Symbol == nil {
				w.jump(on.Anchor, on.Number)
				continue
			}
			w.raw(`<a href="#`)
			w.text(on.Anchor)
			w.raw(`">`)
			w.symbol(on.Symbol)
			w.raw("</a>")
		}
		w.raw("</div></div></div>\n")
	}
}

func (w *writer) cautions(list []render.CautionLine) {
	if len(list) == 0 {
		return
	}
	w.listHead("Cautions")
	for i := range list {
		c := &list[i]
		w.raw(`<div class="row e list" id="`)
		w.text(c.Anchor)
		w.raw(`"><div class="ref"><span class="n">`)
		w.text(c.Number)
		w.raw(`</span></div><div class="more"><p>`)
		w.names(measured(c.Text))
		w.raw(`</p><div class="rest">`)
		for j, h := range c.Helpers {
			if j > 0 {
				w.raw(", ")
			}
			w.text(h)
		}
		w.raw("</div></div></div>\n")
	}
}
