package pdf

import (
	"strconv"
	"strings"

	"github.com/yuin/goldmark/ast"
	extension "github.com/yuin/goldmark/extension/ast"
	segments "github.com/yuin/goldmark/text"

	"gusset/notebook"
	"gusset/render/fonts"
)

// The distances of prose.
const (
	paragraphGap = 5.5
	itemGap      = 2
	blockGap     = 7
	itemIndent   = 15.0
	quoteIndent  = 12.0
	barWidth     = 1.6
)

// prose lays out block after block of the calc's Markdown. A kind that it does
// not know is laid out by what it holds, so that no text is lost.
type prose struct {
	*flow
	doc   *document
	voice voice
	tight bool // in a list whose items stand close
}

func (b *prose) children(n ast.Node) {
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		b.block(c)
	}
}

func (b *prose) block(n ast.Node) {
	switch n := n.(type) {
	case *ast.Heading:
		b.heading(n)
	case *ast.Paragraph:
		b.paragraphOf(n)
	case *ast.TextBlock:
		b.space(itemGap)
		b.paragraph(b.doc.inlines(n, b.voice), b.voice.leading)
	case *ast.Blockquote:
		b.quote(n)
	case *ast.List:
		b.list(n)
	case *ast.CodeBlock:
		b.code(n.Lines())
	case *ast.FencedCodeBlock:
		b.code(n.Lines())
	case *ast.ThematicBreak:
		b.thematicBreak()
	case *extension.Table:
		b.table(n)
	case *notebook.FenceNode:
		b.entries(n.Index)
	case *ast.LinkReferenceDefinition:
	default:
		if n.Type() == ast.TypeInline {
			b.space(paragraphGap)
			b.paragraph(b.doc.inlines(n, b.voice), b.voice.leading)
			return
		}
		b.children(n)
	}
}

// headingSizes are the sizes of the levels of headings, those further down
// taking the last.
var headingSizes = [...]float64{12.5, 11.2, 10.5}

func (b *prose) heading(n *ast.Heading) {
	h := b.doc.page.Sheet.HeadingOf(n)
	level, number, title, anchor := n.Level, "", "", ""
	if h != nil {
		level, number, title, anchor = h.Level, h.Number, h.Text, h.Anchor
	} else {
		title = b.doc.page.Sheet.PlainText(n)
	}
	p := b.doc.inlines(n, b.sized(level))
	b.titled(level, number, title, anchor, p)
}

func (b *prose) sized(level int) voice {
	v := b.voice.strong()
	v.size = headingSizes[min(max(level, 1), len(headingSizes))-1]
	v.leading = v.size * 1.3
	return v
}

// titled pushes a heading. It is kept with what follows.
func (b *prose) titled(level int, number, title, anchor string, p *paragraph) {
	v := b.sized(level)
	if number != "" {
		numbered := &paragraph{}
		numbered.write(v.style(), number+" ")
		p = numbered.followed(p)
	}
	b.space([...]float64{15, 12, 9}[min(max(level, 1), 3)-1])
	from := len(b.slabs)
	b.paragraph(p, v.leading)
	for i := from; i < len(b.slabs); i++ {
		b.slabs[i].keep = true
	}
	if from < len(b.slabs) {
		s := &b.slabs[from]
		s.heading = &heading{strings.TrimSpace(number + " " + title), level}
		if anchor != "" {
			s.anchors = append(s.anchors, anchor)
		}
	}
	b.snug = 4
}

// followed is a paragraph with the words of another behind its own.
func (p *paragraph) followed(q *paragraph) *paragraph {
	out := &paragraph{pieces: append(append([]piece(nil), p.pieces...), q.pieces...)}
	out.words = append(out.words, p.words...)
	for _, w := range q.words {
		w.from, w.to = w.from+len(p.pieces), w.to+len(p.pieces)
		out.words = append(out.words, w)
	}
	return out
}

func (b *prose) paragraphOf(n *ast.Paragraph) {
	if im, ok := n.FirstChild().(*ast.Image); ok && n.FirstChild() == n.LastChild() && b.doc.imageOf(im) != nil {
		b.figure(im)
		return
	}
	b.space(paragraphGap)
	b.paragraph(b.doc.inlines(n, b.voice), b.voice.leading)
	b.space(paragraphGap)
}

// figure sets an image that is a paragraph by itself, kept with its caption.
func (b *prose) figure(n *ast.Image) {
	im := b.doc.imageOf(n)
	w, h := im.fit(b.width, b.doc.tallest())
	s := slab{height: h, keep: true}
	s.ink.pictures = []picture{{b.x, 0, w, h, im}}
	b.space(blockGap)
	b.push(s)
	b.caption(b.doc.imageWords(n))
	b.space(blockGap)
}

// caption pushes the words under a picture, if there are any; the picture is
// kept with them.
func (b *prose) caption(words string) {
	if strings.TrimSpace(words) == "" {
		b.slabs[len(b.slabs)-1].keep = false
		return
	}
	p := &paragraph{}
	p.write(noteVoice.style(), words)
	b.space(3)
	b.paragraph(p, noteVoice.leading)
}

func (b *prose) quote(n *ast.Blockquote) {
	if r := b.doc.page.Sheet.RemarkOf(n); r != nil {
		b.remark(n, r)
		return
	}
	b.space(blockGap)
	b.inset(quoteIndent, band{x: b.x + 1, width: barWidth, colour: hairColour}, func() { b.children(n) })
	b.space(blockGap)
}

// remark sets a quotation that is collected: a bar in its colour, and its kind
// and number in words above it.
func (b *prose) remark(n *ast.Blockquote, r *notebook.Remark) {
	c := markColour
	if r.Kind == notebook.Hold || r.Kind == notebook.Caution {
		c = ngColour
	}
	b.space(blockGap)
	b.inset(quoteIndent, band{x: b.x + 1, width: barWidth, colour: c}, func() {
		label := &paragraph{}
		label.write(noteVoice.strong().in(c).style(), strings.TrimSpace(string(r.Kind)+" "+r.Number))
		from := len(b.slabs)
		b.paragraph(label, noteVoice.leading)
		b.keep()
		b.slabs[from].anchors = append(b.slabs[from].anchors, r.Anchor)
		b.snug = 1.5
		b.children(n)
	})
	b.space(blockGap)
}

func (b *prose) list(n *ast.List) {
	gap := paragraphGap
	if b.tight {
		gap = itemGap
	}
	number := n.Start
	marker := func() string { return "•" }
	indent := itemIndent
	if n.IsOrdered() {
		marker = func() string { return strconv.Itoa(number) + string(n.Marker) }
		last := strconv.Itoa(n.Start+n.ChildCount()) + "."
		indent = max(indent, b.voice.style().width(last)+6)
	}
	tight := b.tight
	b.space(gap)
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		b.tight = n.IsTight
		b.item(c, marker(), indent)
		b.space(map[bool]float64{true: itemGap, false: paragraphGap}[n.IsTight])
		number++
	}
	b.tight = tight
	b.space(gap)
}

// item lays out an item of a list with its marker beside the first line.
func (b *prose) item(n ast.Node, marker string, indent float64) {
	from, x := len(b.slabs), b.x
	b.inset(indent, band{}, func() {
		b.children(n)
		if len(b.slabs) == from {
			b.push(slab{height: b.voice.leading})
		}
		st := b.voice.style()
		s := &b.slabs[from]
		base := s.baseline
		if base == 0 {
			base = 0.72 * b.voice.leading
		}
		at := max(b.x-5-st.width(marker), x)
		if marker == "•" {
			at = x + 3
		}
		s.ink.texts = append([]text{{x: at, y: base, style: st, text: marker}}, s.ink.texts...)
	})
}

// code sets lines as they were typed, on a tint. A line that is too long goes
// on in the next, moved in.
func (b *prose) code(lines *segments.Segments) {
	const pad, leading = 4.0, 11.4
	st := style{face: fonts.Mono, size: 8.8, colour: inkColour}
	b.space(blockGap)
	tint := band{x: b.x, width: b.width, colour: washColour}
	b.inset(0, tint, func() {
		b.push(slab{height: pad, keep: true})
		var rows []slab
		for i := range lines.Len() {
			seg := lines.At(i)
			line := strings.TrimRight(string(seg.Value(b.doc.source)), "\r\n")
			rows = append(rows, b.codeLine(st, line, pad+2, leading)...)
		}
		for i, s := range rows {
			s.keep = i == 0 || i >= len(rows)-2
			b.push(s)
		}
		b.push(slab{height: pad})
	})
	b.space(blockGap)
}

func (b *prose) codeLine(st style, line string, pad, leading float64) []slab {
	p := &paragraph{}
	p.verbatim(st, tabbed(line))
	if len(p.words) == 0 {
		return []slab{{height: leading}}
	}
	width := b.width - 2*pad - 12
	var out []slab
	p = p.fitted(width)
	for i, l := range p.lines(width) {
		s := slab{height: leading}
		x := b.x + pad
		if i > 0 {
			x += 12
		}
		p.set(&s.ink, l, x, 0.74*leading)
		out = append(out, s)
	}
	return out
}

// tabbed replaces tabs by the blanks to the next stop at a multiple of four.
func tabbed(s string) string {
	if !strings.Contains(s, "\t") {
		return s
	}
	var b strings.Builder
	col := 0
	for _, r := range s {
		if r == '\t' {
			n := 4 - col%4
			b.WriteString("    "[:n])
			col += n
			continue
		}
		b.WriteRune(r)
		col++
	}
	return b.String()
}

func (b *prose) thematicBreak() {
	s := slab{height: 1}
	s.ink.fill(b.x+b.width*0.3, 0.3, b.width*0.4, 0.5, softColour)
	b.space(12)
	b.push(s)
	b.space(12)
}

func (b *prose) table(n *extension.Table) {
	b.space(blockGap)
	b.grid(tableVoice, func(v voice) *grid { return b.doc.tableGrid(n, v) }, b.doc.tallest())
	b.space(blockGap)
}

func (d *document) tableGrid(n *extension.Table, v voice) *grid {
	g := &grid{voice: v}
	for r := n.FirstChild(); r != nil; r = r.NextSibling() {
		_, head := r.(*extension.TableHeader)
		cellVoice := v
		if head {
			cellVoice = v.strong()
		}
		var row gridRow
		for c := r.FirstChild(); c != nil; c = c.NextSibling() {
			cell := gridCell{p: d.inlines(c, cellVoice)}
			if tc, ok := c.(*extension.TableCell); ok {
				cell.align = alignOf(tc.Alignment)
			}
			row.cells = append(row.cells, cell)
		}
		if head {
			g.head = row
		} else {
			g.rows = append(g.rows, row)
		}
	}
	return g
}

func alignOf(a extension.Alignment) alignment {
	switch a {
	case extension.AlignRight:
		return right
	case extension.AlignCenter:
		return center
	}
	return left
}

// imageOf returns the image that a node shows, nil where it cannot be shown.
func (d *document) imageOf(n *ast.Image) *image { return d.album.image(string(n.Destination)) }

// imageWords are the words of an image: what it shows, and its title behind.
func (d *document) imageWords(n *ast.Image) string {
	words, title := d.page.Sheet.PlainText(n), notebook.Unescape(n.Title)
	if title == "" || title == words {
		return words
	}
	if words == "" {
		return title
	}
	return words + " – " + title
}
