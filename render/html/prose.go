package html

import (
	"bytes"
	"strings"
	"unicode/utf8"

	"github.com/yuin/goldmark/ast"
	east "github.com/yuin/goldmark/extension/ast"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/maths"
)

// document writes the prose and the blocks within it, from one block up to
// another, one row of the three columns for each.
func (w *writer) document(from, to ast.Node) {
	for n := from; n != to; n = n.NextSibling() {
		if f, ok := n.(*notebook.FenceNode); ok {
			w.entries(w.page.Blocks[f.Index])
			continue
		}
		if n.Kind() == ast.KindHeading {
			w.raw(`<div class="row head"><div class="mid">`)
		} else {
			w.raw(`<div class="row prose"><div class="mid">`)
		}
		w.block(n)
		w.raw("</div></div>\n")
	}
}

// children writes the nodes within a node.
func (w *writer) children(n ast.Node) {
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		if c.Type() == ast.TypeInline {
			w.inline(c)
		} else {
			w.block(c)
		}
	}
}

func (w *writer) block(n ast.Node) {
	switch n := n.(type) {
	case *ast.Paragraph:
		if w.figure(n) {
			return
		}
		w.raw("<p>")
		w.children(n)
		w.raw("</p>")
	case *ast.TextBlock:
		w.children(n)
		if n.NextSibling() != nil {
			w.raw("\n")
		}
	case *ast.Heading:
		w.heading(n)
	case *ast.ThematicBreak:
		w.raw("<hr>")
	case *ast.CodeBlock, *ast.FencedCodeBlock:
		w.code(n)
	case *ast.Blockquote:
		w.quote(n)
	case *ast.List:
		w.list(n)
	case *ast.ListItem:
		w.raw("<li>")
		w.children(n)
		w.raw("</li>\n")
	case *east.Table:
		w.markdownTable(n)
	case *notebook.FenceNode:
		w.raw(`<div class="nested">`)
		w.inset = w.insetOf(n)
		w.entries(w.page.Blocks[n.Index])
		w.inset = 0
		w.raw("</div>")
	case *ast.HTMLBlock:
		w.raw("<p>")
		w.lines(n)
		if n.HasClosure() {
			w.text(string(n.ClosureLine.Value(w.source)))
		}
		w.raw("</p>")
	default:
		w.children(n)
	}
}

// insetOf is how far a block is set in by the quotes and lists about it, in
// millimetres.
func (w *writer) insetOf(n ast.Node) float64 {
	inset := 0.0
	for p := n.Parent(); p != nil; p = p.Parent() {
		switch p := p.(type) {
		case *ast.List:
			inset += 6
		case *ast.Blockquote:
			if w.sheet.RemarkOf(p) != nil {
				inset += 31
			} else {
				inset += 4.5
			}
		}
	}
	return inset
}

func (w *writer) heading(n *ast.Heading) {
	level, number := n.Level+1, ""
	anchor := ""
	if h := w.sheet.HeadingOf(n); h != nil {
		level, number, anchor = h.Level+1, h.Number, h.Anchor
	}
	tag := []string{"h2>", "h3>", "h4>", "h5>", "h6>"}[min(max(level-2, 0), 4)]
	w.raw("<")
	w.raw(tag[:2])
	if anchor != "" {
		w.raw(` id="`)
		w.text(anchor)
		w.raw(`"`)
	}
	w.raw(">")
	if number != "" {
		w.raw(`<span class="no">`)
		w.text(number)
		w.raw("</span> ")
	}
	w.children(n)
	w.raw("</")
	w.raw(tag)
}

// lines writes the lines of a block as they stand in the file.
func (w *writer) lines(n ast.Node) {
	lines := n.Lines()
	for i := range lines.Len() {
		at := lines.At(i)
		w.text(string(at.Value(w.source)))
	}
}

func (w *writer) code(n ast.Node) {
	w.mono = true
	w.raw("<pre tabindex=\"0\"><code>")
	w.lines(n)
	w.raw("</code></pre>")
}

// quote writes a block quote, or a remark that is collected.
func (w *writer) quote(n *ast.Blockquote) {
	r := w.sheet.RemarkOf(n)
	if r == nil {
		w.raw("<blockquote>")
		w.children(n)
		w.raw("</blockquote>")
		return
	}
	w.raw(`<div class="remark `)
	switch r.Kind {
	case notebook.Assumption:
		w.raw("assumption")
	case notebook.Caution:
		w.raw("caution")
	case notebook.Hold:
		w.raw("hold")
	default:
		w.raw("remark-note")
	}
	w.raw(`" role="note" id="`)
	w.text(r.Anchor)
	w.raw(`"><b class="lead">`)
	w.raw(string(r.Kind))
	if r.Number != "" {
		w.raw(" ")
		w.text(r.Number)
	}
	w.raw("</b><div>")
	w.children(n)
	w.raw("</div></div>")
}

func (w *writer) list(n *ast.List) {
	tag := "ul>"
	if n.IsOrdered() {
		tag = "ol>"
	}
	w.raw("<")
	w.raw(tag[:2])
	if n.IsOrdered() && n.Start != 1 {
		w.raw(` start="`)
		w.int(n.Start)
		w.raw(`"`)
	}
	if n.IsTight {
		w.raw(` class="tight"`)
	}
	w.raw(">\n")
	w.children(n)
	w.raw("</")
	w.raw(tag)
}

// manyColumns is from how many columns on a table is set smaller on paper, where
// nothing scrolls.
const manyColumns = 8

func (w *writer) markdownTable(n *east.Table) {
	w.raw(`<div class="rows" tabindex="0"><table`)
	if len(n.Alignments) >= manyColumns {
		w.raw(` class="wide"`)
	}
	w.raw(">")
	body := false
	for row := n.FirstChild(); row != nil; row = row.NextSibling() {
		_, header := row.(*east.TableHeader)
		switch {
		case header:
			w.raw("<thead><tr>")
		case !body:
			w.raw("<tbody>\n<tr>")
			body = true
		default:
			w.raw("<tr>")
		}
		for c := row.FirstChild(); c != nil; c = c.NextSibling() {
			w.tableCell(c, header)
		}
		w.raw("</tr>")
		if header {
			w.raw("</thead>")
		}
		w.raw("\n")
	}
	if body {
		w.raw("</tbody>")
	}
	w.raw("</table></div>")
}

func (w *writer) tableCell(n ast.Node, header bool) {
	tag := "td>"
	if header {
		tag = "th>"
	}
	w.raw("<")
	w.raw(tag[:2])
	if cell, ok := n.(*east.TableCell); ok {
		switch cell.Alignment {
		case east.AlignRight:
			w.raw(` class="r"`)
		case east.AlignCenter:
			w.raw(` class="c"`)
		}
	}
	w.raw(">")
	w.children(n)
	w.raw("</")
	w.raw(tag)
}

func (w *writer) inline(n ast.Node) {
	switch n := n.(type) {
	case *ast.Text:
		w.prose(n)
	case *ast.String:
		w.text(string(n.Value))
	case *ast.CodeSpan:
		w.codeSpan(n)
	case *ast.Emphasis:
		w.emphasis(n)
	case *ast.Link:
		w.raw(`<a href="`)
		w.text(string(n.Destination))
		if len(n.Title) > 0 {
			w.raw(`" title="`)
			w.text(notebook.Unescape(n.Title))
		}
		w.raw(`" rel="noopener noreferrer">`)
		w.children(n)
		w.raw("</a>")
	case *ast.AutoLink:
		w.autoLink(n)
	case *ast.Image:
		w.picture(n)
	case *notebook.ValueNode:
		w.named(n)
	case *ast.RawHTML:
		for i := range n.Segments.Len() {
			at := n.Segments.At(i)
			w.text(string(at.Value(w.source)))
		}
	default:
		w.children(n)
	}
}

// prose writes a run of text, its backslashes and references resolved.
func (w *writer) prose(n *ast.Text) {
	raw := n.Segment.Value(w.source)
	text := ""
	switch {
	case n.IsRaw() || bytes.IndexByte(raw, '\\') < 0 && bytes.IndexByte(raw, '&') < 0:
		text = string(raw)
	default:
		text = notebook.Unescape(raw)
	}
	w.words(text)
	switch {
	case n.HardLineBreak():
		w.raw("<br>\n")
	case n.SoftLineBreak():
		w.raw("\n")
	}
}

// words writes prose whose numbers stay on one line with their units.
func (w *writer) words(text string) {
	from := 0
	for i := 1; i < len(text); i++ {
		if text[i] == ' ' && text[i-1] >= '0' && text[i-1] <= '9' && render.Measured(text[:i], text[i+1:]) {
			w.names(text[from:i])
			w.raw("\u00a0")
			from = i + 1
		}
	}
	w.names(text[from:])
}

// longestName bounds the names that are held together, in bytes.
const longestName = 16

// names writes a text in which no line breaks behind a hyphen in a name with
// figures: K-301, EN 1993-1-8.
func (w *writer) names(text string) {
	from := 0
	for i := 0; i < len(text); {
		n := strings.IndexAny(text[i:], " \n\t\u00a0")
		if n < 0 {
			n = len(text) - i
		}
		if word := text[i : i+n]; len(word) <= longestName && numbered(word) {
			w.text(text[from:i])
			w.raw(`<span class="nb">`)
			w.text(word)
			w.raw("</span>")
			from = i + n
		}
		i += n
		_, blank := utf8.DecodeRuneInString(text[i:])
		i += blank
	}
	w.text(text[from:])
}

// numbered tells a word with a hyphen inside that stands beside a figure.
func numbered(word string) bool {
	for i := 1; i+1 < len(word); i++ {
		if word[i] == '-' && (digit(word[i-1]) || digit(word[i+1])) {
			return true
		}
	}
	return false
}

func digit(c byte) bool { return c >= '0' && c <= '9' }

// measured is a text whose numbers stay on the line of their units.
func measured(s string) string {
	var b strings.Builder
	from := 0
	for i := 1; i < len(s)-1; i++ {
		if s[i] == ' ' && render.Measured(s[:i], s[i+1:]) {
			b.WriteString(s[from:i])
			b.WriteString("\u00a0")
			from = i + 1
		}
	}
	if from == 0 {
		return s
	}
	b.WriteString(s[from:])
	return b.String()
}

func (w *writer) codeSpan(n ast.Node) {
	w.mono = true
	w.raw("<code>")
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		t, ok := c.(*ast.Text)
		if !ok {
			w.inline(c)
			continue
		}
		raw := t.Segment.Value(w.source)
		line, broken := bytes.CutSuffix(raw, []byte("\n"))
		w.text(string(bytes.TrimSuffix(line, []byte("\r"))))
		if broken {
			w.raw(" ")
		}
	}
	w.raw("</code>")
}

func (w *writer) emphasis(n *ast.Emphasis) {
	tag := "em>"
	if n.Level == 2 {
		tag = "strong>"
	}
	for p := n.Parent(); p != nil; p = p.Parent() {
		if e, ok := p.(*ast.Emphasis); ok && e.Level != n.Level || p.Kind() == ast.KindHeading || p.Kind() == east.KindTableHeader {
			w.strong = true
		}
	}
	w.raw("<")
	w.raw(tag)
	w.children(n)
	w.raw("</")
	w.raw(tag)
}

func (w *writer) autoLink(n *ast.AutoLink) {
	w.raw(`<a href="`)
	if n.AutoLinkType == ast.AutoLinkEmail {
		w.raw("mailto:")
	}
	w.text(string(n.URL(w.source)))
	w.raw(`" rel="noopener noreferrer">`)
	w.text(string(n.Label(w.source)))
	w.raw("</a>")
}

// figure writes a paragraph that is nothing but an image: its words are the
// caption.
func (w *writer) figure(n *ast.Paragraph) bool {
	img, ok := n.FirstChild().(*ast.Image)
	if !ok || n.FirstChild() != n.LastChild() || w.sheet.Images[string(img.Destination)] == nil {
		return false
	}
	words, title := w.sheet.PlainText(img), notebook.Unescape(img.Title)
	w.raw("<figure>")
	w.image(string(img.Destination), words, "", "")
	switch {
	case words == "":
		words = title
	case title != "" && title != words:
		words += " – " + title
	}
	if strings.TrimSpace(words) != "" {
		w.raw("<figcaption>")
		w.names(measured(words))
		w.raw("</figcaption>")
	}
	w.raw("</figure>")
	return true
}

// picture writes an image in a line of text.
func (w *writer) picture(n *ast.Image) {
	path := string(n.Destination)
	alternative := w.sheet.PlainText(n)
	if w.sheet.Images[path] == nil {
		w.text(alternative)
		return
	}
	w.image(path, alternative, notebook.Unescape(n.Title), "")
}

// named writes a value named in the text.
func (w *writer) named(n *notebook.ValueNode) {
	for _, p := range w.page.Values[n.Index] {
		w.text(p.Words)
		switch p.Value.(type) {
		case nil:
		case maths.Text:
			w.value(p.Value)
		default:
			w.raw(`<span class="nb">`)
			w.value(p.Value)
			w.raw("</span>")
		}
	}
}
