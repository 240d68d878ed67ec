package html

import (
	"bytes"
	"slices"
	"strconv"
	"unicode"

	"gusset/render"
	"gusset/render/maths"
)

// entries writes the lines of a block.
func (w *writer) entries(list []render.Entry) {
	for i := range list {
		w.entry(&list[i])
	}
}

// The sizes of formulas in points, as the style sheet has them.
const (
	entrySize   = 11.5
	limitSize   = 10.0
	summarySize = 10.5
	phraseSize  = 9.5
)

// column is the width of a formula's column in ems: that of the calculation
// column, as wide as paper and screen leave it at most, less what entries are
// set in.
func (w *writer) column(indent int, size float64) float64 {
	const mm = 72 / 25.4
	width := 118.0
	if w.page.Title.Paper == "Letter" {
		width = 123.9
	}
	width -= w.inset + [...]float64{0, 5, 9}[min(indent, 2)]
	return max(width, 30) * mm / size
}

var kinds = [...]string{
	render.Line: "line", render.Formula: "formula", render.Check: "check", render.NoteLine: "said", render.Gap: "gap",
	render.Definition: "formula", render.HelperHead: "helper", render.Limit: "limit", render.Tabular: "tabular", render.DrawingOf: "drawing",
}

func (w *writer) entry(e *render.Entry) {
	w.open(e)
	w.references(e)
	w.note(e.Note)
	if e.Formula.Left != nil || len(e.Formula.Steps) > 0 {
		w.raw(`<div class="eq">`)
		size := entrySize
		if e.Kind == render.Limit || e.Kind == render.HelperHead {
			size = limitSize
		}
		w.b = maths.AppendChain(w.b, e.Formula, w.column(e.Indent, size))
		w.raw("</div>")
	}
	if len(e.Below)+len(e.Trials)+len(e.Tables) > 0 || e.Drawing != nil {
		w.raw(`<div class="more">`)
		for i := range e.Below {
			w.phrase(&e.Below[i], e.Indent)
		}
		w.trials(e.Trials)
		if len(e.Tables) > 1 {
			w.raw(`<div class="pair">`)
		}
		for _, t := range e.Tables {
			w.table(t)
		}
		if len(e.Tables) > 1 {
			w.raw("</div>")
		}
		if e.Drawing != nil {
			w.drawing(e.Drawing)
		}
		w.raw("</div>")
	}
	w.output(e)
	w.raw("</div>\n")
}

// open starts the row of an entry.
func (w *writer) open(e *render.Entry) {
	w.raw(`<div class="row e `)
	w.raw(kinds[e.Kind])
	if e.Indent > 0 {
		w.raw(" in in")
		w.int(min(e.Indent, 3))
	}
	if v := e.Verdict; v != nil && e.Kind == render.Check {
		switch {
		case !v.Required:
			w.raw(" free")
		case v.OK:
			w.raw(" ok")
		default:
			w.raw(" ng")
		}
	}
	w.raw(`"`)
	if e.Anchor != "" {
		w.raw(` id="`)
		w.text(e.Anchor)
		w.raw(`"`)
	}
	w.raw(">")
}

// references writes the reference column: the number and the sources.
func (w *writer) references(e *render.Entry) {
	if e.Number == "" && len(e.Refs) == 0 {
		return
	}
	w.raw(`<div class="ref">`)
	if e.Number != "" {
		w.raw(`<span class="n">(`)
		w.text(e.Number)
		w.raw(")</span>")
	}
	for _, r := range e.Refs {
		w.raw("<span>")
		w.jump(r.Target, withNumbers(r.Text))
		w.raw("</span>")
	}
	w.raw("</div>")
}

// withNumbers is a source whose numbers and letters of revision stand on the line
// of the word before them: Table 3.4, Table J3.2, rev B.
func withNumbers(s string) string {
	b := []byte(s)
	for i := len(b) - 2; i > 0; i-- {
		number := unicode.IsLetter(rune(b[i-1])) && (digit(b[i+1]) || i+2 < len(b) && b[i+1] >= 'A' && b[i+1] <= 'Z' && digit(b[i+2]))
		if b[i] == ' ' && (number || bytes.HasSuffix(b[:i], []byte(" rev"))) {
			b = slices.Replace(b, i, i+1, []byte("\u00a0")...)
		}
	}
	return string(b)
}

func (w *writer) output(e *render.Entry) {
	if e.Output == nil && e.Mark == "" && e.Verdict == nil {
		return
	}
	w.raw(`<div class="out">`)
	if e.Output != nil {
		w.raw("<b>")
		w.value(e.Output)
		w.raw("</b>")
	}
	if e.Verdict != nil {
		w.verdict(e.Verdict)
	}
	if e.Mark != "" {
		w.raw(`<span class="mark">`)
		w.text(e.Mark)
		w.raw("</span>")
	}
	w.raw("</div>")
}

// verdict writes how a check came out, with its bar.
func (w *writer) verdict(v *render.Verdict) {
	w.raw(`<div class="u`)
	switch {
	case !v.Required:
		w.raw(" free")
	case !v.OK:
		w.raw(" ng")
	default:
		w.raw(" ok")
	}
	w.raw(`">`)
	if v.Utilisation != "" {
		w.raw("<span>")
		w.figures(v.Utilisation)
		w.raw("</span>")
	}
	w.raw("<b>")
	w.text(v.Word)
	w.raw("</b></div>")
	if fill, beyond, ok := v.Bar(); ok {
		w.raw(`<div class="bar" aria-hidden="true"><i`)
		if beyond {
			w.raw(` class="over"`)
		}
		w.raw(` style="width:`)
		w.b = strconv.AppendFloat(w.b, 100*fill, 'f', 1, 64)
		w.raw(`%"></i></div>`)
	}
}

// phrase writes a small line below a formula.
func (w *writer) phrase(p *render.Phrase, indent int) {
	w.raw(`<div class="below">`)
	w.phraseText(p, indent)
	w.raw("</div>")
}

func (w *writer) phraseText(p *render.Phrase, indent int) {
	if p.Before != "" {
		w.raw("<span>")
		w.text(p.Before)
		w.raw("</span>")
	}
	if p.Formula.Left != nil || len(p.Formula.Steps) > 0 {
		w.b = maths.AppendChain(w.b, p.Formula, w.column(indent, phraseSize))
	}
	if p.After != "" {
		w.raw("<span>")
		w.text(p.After)
		w.raw("</span>")
	}
}

// trials lists what `first of` tried.
func (w *writer) trials(list []render.Trial) {
	if len(list) == 0 {
		return
	}
	w.raw(`<table class="trials"><thead><tr><th>tried</th><th>condition</th><th>outcome</th></tr></thead><tbody>`)
	for _, t := range list {
		w.raw("<tr><td>")
		w.figures(t.Value)
		if t.Mark != "" {
			w.raw(" (")
			w.text(t.Mark)
			w.raw(")")
		}
		w.raw("</td><td>")
		w.figures(t.Why)
		if t.OK {
			w.raw("</td><td><b>holds, taken</b></td></tr>")
		} else {
			w.raw("</td><td>fails</td></tr>")
		}
	}
	w.raw("</tbody></table>")
}

// longTable is from how many rows on a table may go over a page's foot.
const longTable = 24

// table writes a table over rows. All rows are there; those that paper leaves
// out are hidden when the page is printed.
func (w *writer) table(t *render.Table) {
	if t.Rows-t.Left() > longTable {
		w.raw(`<div class="rows long" tabindex="0"><table>`)
	} else {
		w.raw(`<div class="rows" tabindex="0"><table>`)
	}
	if t.Caption != "" || t.Left() > 0 {
		w.raw("<caption>")
		w.text(t.Caption)
		if t.Left() > 0 {
			w.raw(`<span class="paper"> `)
			w.int(t.Left())
			w.raw(" of ")
			w.int(t.Rows)
			w.raw(" rows left out in print</span>")
		}
		w.raw("</caption>")
	}
	w.raw("<thead><tr>")
	for i := range t.Heads {
		w.tableHead(&t.Heads[i])
	}
	w.raw("</tr></thead><tbody>\n")
	next := 0 // the place in Printed
	var cell []byte
	for row := range t.Rows {
		left := t.Printed != nil
		if left && next < len(t.Printed) && t.Printed[next] == row {
			left = false
			next++
		}
		w.raw("<tr")
		switch marked := t.Marked(row); {
		case marked:
			w.raw(` class="g"`)
		case left:
			w.raw(` class="x"`)
		}
		w.raw(">")
		for col := range t.Heads {
			switch {
			case t.Heads[col].Right && t.Governs(row, col):
				w.raw(`<td class="r"><b>`)
			case t.Heads[col].Right:
				w.raw(`<td class="r">`)
			case t.Governs(row, col):
				w.raw(`<td><b>`)
			default:
				w.raw("<td>")
			}
			cell = t.AppendCell(cell[:0], row, col)
			w.figures(string(cell))
			if t.Governs(row, col) {
				w.raw("</b>")
			}
			w.raw("</td>")
		}
		w.raw("</tr>\n")
	}
	w.raw("</tbody></table></div>")
}

func (w *writer) tableHead(h *render.Head) {
	w.raw("<th")
	if h.Anchor != "" {
		w.raw(` id="`)
		w.text(h.Anchor)
		w.raw(`"`)
	}
	if h.Right {
		w.raw(` class="r"`)
	}
	w.raw(` scope="col">`)
	w.text(h.Words)
	w.symbol(h.Symbol)
	if len(h.Unit) > 0 {
		w.raw(` <span>[`)
		w.unit(h.Unit)
		w.raw("]</span>")
	}
	w.raw("</th>")
}

// drawing writes a plot or a figure with its caption.
func (w *writer) drawing(d *render.Drawing) {
	w.raw("<figure>")
	if d.Art != nil {
		w.b = d.Art.SVG(w.b, "figure-"+d.Number)
	}
	w.raw("<figcaption><b>Figure ")
	w.text(d.Number)
	w.raw("</b>")
	if d.Caption != "" {
		w.raw(" ")
		w.text(d.Caption)
	}
	w.raw("</figcaption></figure>")
}
