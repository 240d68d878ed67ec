package pdf

import (
	"strconv"
	"strings"

	"gusset/render"
	"gusset/render/fonts"
)

// The measures of the title block, the strip that stands in for it on the
// sheets that follow, and the heads of the columns.
const (
	cellWidth        = 21 * mm
	cellPad          = 2 * mm
	frameRule        = 1.2
	hairRule         = 0.5
	headsRule        = 0.8
	stripHeight      = 22.0
	columnHeadHeight = 28.0 // with the space below their rule
	headsRuleAt      = 20.0
	logoWidth        = 26 * mm
	logoHeight       = 13 * mm
)

var (
	labelStyle = style{face: fonts.Sans, size: 6.5, colour: softColour}
	cellStyle  = style{face: fonts.Sans, size: 8, colour: inkColour}
	headStyle  = style{face: fonts.SansSemiBold, size: 7, colour: softColour}
	stripStyle = style{face: fonts.Sans, size: 7.6, colour: softColour}
	nameStyle  = style{face: fonts.SerifSemiBold, size: 13, colour: inkColour}
)

// working says that a copy is not a controlled issue.
const working = "Working copy"

// titleBlock is the block at the head of the first sheet, measured from the
// left and top margins. Its last cell takes the sheet's number.
type titleBlock struct {
	ink    ink
	height float64 // with the top margin
	sheet  text    // where the sheet's number goes
}

func (d *document) titleBlock() titleBlock {
	var t titleBlock
	k := &t.ink
	width := d.paper.inner()
	cellsAt := width - 4*cellWidth
	rows := [2]float64{}
	for i, c := range d.page.Title.Cells {
		rows[i/4] = max(rows[i/4], d.cell(nil, c, 0, 0))
	}
	name, nameHeight := d.titleName(cellsAt)
	if lack := nameHeight - rows[0] - rows[1]; lack > 0 {
		rows[0] += lack / 2
		rows[1] += lack / 2
	}
	height := rows[0] + rows[1]
	k.add(&name, 0, (height-nameHeight)/2)
	for i, c := range d.page.Title.Cells {
		x, y := cellsAt+float64(i%4)*cellWidth, float64(i/4)*rows[0]
		d.cell(k, c, x, y)
		if i == len(d.page.Title.Cells)-1 {
			t.sheet = text{x: x + cellPad, y: y + cellTextAt, style: cellStyle}
		}
		if i < 4 {
			k.fill(x, 0, hairRule, height, hairColour)
		}
	}
	k.fill(cellsAt, rows[0], 4*cellWidth, hairRule, hairColour)
	stateHeight := d.stateBox(k, height)
	k.fill(0, height-frameRule/2, width, frameRule, inkColour)
	frame(k, width, height+stateHeight)
	t.height = topMargin + height + stateHeight
	return t
}

// frame draws the edges of a box from the origin.
func frame(k *ink, w, h float64) {
	k.fill(0, 0, w, frameRule, inkColour)
	k.fill(0, h-frameRule, w, frameRule, inkColour)
	k.fill(0, 0, frameRule, h, inkColour)
	k.fill(w-frameRule, 0, frameRule, h, inkColour)
}

// cellTextAt is the first baseline of a cell's text below its top edge.
const cellTextAt = 21.0

// cell draws a cell of the title block and returns its height; without ink it
// only measures.
func (d *document) cell(k *ink, c render.Cell, x, y float64) float64 {
	const leading = 10.2
	width := cellWidth - 2*cellPad + 2
	at := y + cellTextAt
	if k != nil {
		k.texts = append(k.texts, text{x: x + cellPad, y: y + 10.5, style: labelStyle, text: plainLine(c.Label), tracked: 0.2})
	}
	for _, s := range []string{c.Text, c.Date} {
		p := &paragraph{}
		p.write(cellStyle, s)
		p, lines := p.few(width, 5)
		for _, l := range lines {
			if k != nil {
				p.set(k, l, x+cellPad, at)
			}
			at += leading
		}
	}
	return max(at-leading, y+cellTextAt) + 6.5 - y
}

// plainLine is a text of the program's own or one that is set in one face
// whatever it holds: what the face has not is left to its equivalents.
func plainLine(s string) string { return strings.TrimSpace(settable(s)) }

// titleName sets logo, firm, title and what stands under it, and returns their
// height.
func (d *document) titleName(width float64) (ink, float64) {
	var k ink
	x, pad := cellPad+1, 7.0
	logoBottom := 0.0
	if d.page.Title.Logo != "" {
		if im := d.album.image(d.page.Title.Logo); im != nil {
			w, h := im.fill(logoWidth, logoHeight)
			k.pictures = append(k.pictures, picture{x, pad, w, h, im})
			x += w + 8
			logoBottom = pad + h + pad
		}
	}
	room := width - x - 6
	y := pad
	put := func(st style, s string, leading float64) {
		if s == "" {
			return
		}
		p := &paragraph{}
		p.write(st, s)
		p, lines := p.few(p.balanced(room), 5)
		for _, l := range lines {
			p.set(&k, l, x, y+0.78*leading)
			y += leading
		}
	}
	firm := headStyle
	firm.size = 7.6
	put(firm, d.page.Title.Firm, 12)
	put(nameStyle, d.page.Title.Title, 16.5)
	put(cellStyle, d.page.Title.Under, 10.6)
	return k, max(y+pad, logoBottom)
}

// fill is the size that an image takes in a box that it fills one way.
func (m *image) fill(width, height float64) (w, h float64) {
	w, h = width, width*float64(m.height)/float64(m.width)
	if h > height {
		w, h = height*float64(m.width)/float64(m.height), height
	}
	return w, h
}

// stateBox draws the box under the title block from its top edge down: how
// the checks stand, and what the calc rests on.
func (d *document) stateBox(k *ink, top float64) float64 {
	const leading, pad = 11.0, 4.5
	p := &paragraph{}
	for _, item := range d.stateItems() {
		for _, w := range item {
			p.append(w.style, w.text)
		}
		p.words[len(p.words)-1].space = 17
		p.open = false
	}
	mark := stripStyle
	mark.size, mark.colour = 8, inkColour
	width := d.paper.inner() - 2*cellPad - 2
	room := width - mark.width(working) - 14
	p = p.fitted(room)
	y := top + pad
	for i, l := range p.lines(room) {
		y += leading
		p.set(k, l, cellPad+1, y-2.5)
		if i == 0 {
			k.texts = append(k.texts, text{x: cellPad + 1 + width - mark.width(working), y: y - 2.5, style: mark, text: working})
		}
	}
	return y + pad - top
}

type styled struct {
	style
	text string
}

// stateItems are the items of the state box, each a few words in a style.
func (d *document) stateItems() [][]styled {
	s := &d.page.State
	heavy := cellStyle.in(fonts.SansSemiBold)
	counted := func(n int, one, many string) []styled {
		word := many
		if n == 1 {
			word = one
		}
		return []styled{{heavy, strconv.Itoa(n)}, {cellStyle, " " + word}}
	}
	items := [][]styled{counted(s.Checks, "check", "checks")}
	if s.Checks > 0 {
		ng := counted(s.NG, "NG", "NG")
		if s.NG > 0 {
			ng = []styled{{heavy, strconv.Itoa(s.NG) + " NG"}}
			ng[0].colour = ngColour
		}
		items = append(items, ng)
	}
	if s.NotRequired > 0 {
		items = append(items, counted(s.NotRequired, "not required", "not required"))
	}
	if w := s.Worst; w != nil && w.Verdict != nil {
		link, linked := cellStyle, heavy
		link.link, linked.link = "#"+w.Anchor, "#"+w.Anchor
		link.colour = markColour
		items = append(items, []styled{{cellStyle, "worst "}, {linked, w.Verdict.Utilisation}, {link, " (" + w.Number + ")"}})
	}
	return append(items, counted(s.Holds, "hold", "holds"), counted(s.Assumptions, "assumption", "assumptions"))
}

// furniture draws what every sheet has besides its body: the title block or
// the strip, the heads of the columns and the rules between them.
func (l *layout) furniture(c *canvas, page int) {
	count := strconv.Itoa(page+1) + " of " + strconv.Itoa(len(l.pages))
	top := topMargin + stripHeight
	if page == 0 {
		top = l.title.height
		c.draw(&l.title.ink, sideMargin, topMargin)
		sheet := l.title.sheet
		sheet.text = count
		c.text(&sheet, sideMargin+sheet.x, topMargin+sheet.y)
	} else {
		k := l.strip(count)
		c.draw(&k, sideMargin, topMargin)
	}
	k := l.columns(l.paper.foot() - top)
	c.draw(&k, sideMargin, top)
}

// strip is the line at the head of the sheets after the first.
func (l *layout) strip(count string) ink {
	var k ink
	const base = 9.0
	width := l.paper.inner()
	sheet := "Sheet " + count
	mark := stripStyle.in(fonts.SansSemiBold)
	sheetAt := width - stripStyle.width(sheet)
	markAt := sheetAt - 18 - mark.width(working)
	f := &l.page.Sheet.Front
	number := f.Calc
	if f.Rev != "" {
		number += " rev " + f.Rev
	}
	p := &paragraph{}
	p.write(stripStyle.in(fonts.SansSemiBold), number)
	p.blank(stripStyle)
	title := l.page.Title.Title
	if title != f.Calc {
		p.write(stripStyle, "· "+title)
	}
	room := markAt - 14
	p, lines := p.few(room, 1)
	for _, l := range lines {
		p.set(&k, l, 0, base)
	}
	k.texts = append(k.texts,
		text{x: markAt, y: base, style: mark, text: working},
		text{x: sheetAt, y: base, style: stripStyle, text: sheet})
	k.fill(0, 14.5, width, frameRule, inkColour)
	return k
}

// columns are the heads of the columns and the rules between them, down to the
// foot of the sheet.
func (l *layout) columns(height float64) ink {
	var k ink
	width := l.paper.inner()
	const base = 14.5
	x, _ := l.paper.calculation()
	out, _ := l.paper.output()
	head := func(s string, at float64) {
		k.texts = append(k.texts, text{x: at, y: base, style: headStyle, text: s, tracked: 0.4})
	}
	reference := "Reference"
	head(reference, referenceWidth-referencePad-headStyle.width(reference)-0.4*float64(len(reference)))
	head("Calculation", x)
	head("Output", out)
	k.fill(0, headsRuleAt, width, headsRule, inkColour)
	rules := headsRuleAt + headsRule
	k.fill(referenceWidth-hairRule/2, rules, hairRule, height-rules, hairColour)
	k.fill(width-outputWidth-hairRule/2, rules, hairRule, height-rules, hairColour)
	return k
}
