package notebook

import (
	"strings"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/text"
	"github.com/yuin/goldmark/util"
)

var remarkKinds = []RemarkKind{Assumption, Caution, Hold, Note}

// remark is a block quote that is collected, before its text is known.
type remark struct {
	node ast.Node
	kind RemarkKind
}

// findRemarks takes the leading word off every quote that starts with one. A
// line or a paragraph within such a quote that starts with a leading word again
// begins a remark of its own: no assumption hides in another's text.
func (d *Draft) findRemarks() {
	var quotes []ast.Node
	for n := range nodes(d.doc) {
		if n.Kind() == ast.KindBlockquote {
			quotes = append(quotes, n)
		}
	}
	for _, quote := range quotes {
		if kind := d.leadOf(quote.FirstChild()); kind != "" {
			d.splitRemarks(quote)
		}
	}
}

func (d *Draft) splitRemarks(quote ast.Node) {
	for c := quote.FirstChild(); c != nil; c = c.NextSibling() {
		d.splitLines(c)
	}
	var children []ast.Node
	for c := quote.FirstChild(); c != nil; c = c.NextSibling() {
		children = append(children, c)
	}
	at := quote
	for i, c := range children {
		kind := d.leadOf(c)
		if kind != "" {
			d.takeLead(c, kind)
			if i > 0 {
				next := ast.NewBlockquote()
				next.SetPos(c.Pos())
				at.Parent().InsertAfter(at.Parent(), at, next)
				at = next
			}
			d.remarks = append(d.remarks, remark{at, kind})
		}
		if at != quote {
			at.AppendChild(at, c)
		}
	}
}

// leadOf is the leading word of a paragraph, "" where it has none.
func (d *Draft) leadOf(block ast.Node) RemarkKind {
	if block == nil || block.Kind() != ast.KindParagraph {
		return ""
	}
	return d.leadWord(block.FirstChild())
}

// leadWord is the leading word that starts with an inline node: `Hold:`, marked
// or not, with the colon within the marks or behind them.
func (d *Draft) leadWord(n ast.Node) RemarkKind {
	if t, ok := n.(*ast.Text); ok {
		return kindBefore(d.value(t))
	}
	inner := n
	for inner != nil && inner.Kind() == ast.KindEmphasis && inner.ChildCount() == 1 {
		inner = inner.FirstChild()
	}
	t, ok := inner.(*ast.Text)
	if !ok {
		return ""
	}
	word := d.value(t)
	if next, ok := n.NextSibling().(*ast.Text); ok && strings.HasPrefix(d.value(next), ":") {
		word += ":"
	}
	if kind := kindBefore(word); kind != "" && len(word) == len(kind)+1 {
		return kind
	}
	return ""
}

func kindBefore(text string) RemarkKind {
	for _, k := range remarkKinds {
		if rest, ok := strings.CutPrefix(text, string(k)); ok && strings.HasPrefix(rest, ":") {
			return k
		}
	}
	return ""
}

func (d *Draft) value(t *ast.Text) string { return string(t.Segment.Value(d.source.Text)) }

// takeLead removes the leading word, its colon and the blanks behind it.
func (d *Draft) takeLead(block ast.Node, kind RemarkKind) {
	first := block.FirstChild()
	colon := 0
	if t, ok := first.(*ast.Text); ok {
		colon = len(kind) + 1
		d.cut(block, t, colon)
		return
	}
	next := first.NextSibling()
	block.RemoveChild(block, first)
	if t, ok := next.(*ast.Text); ok {
		if strings.HasPrefix(d.value(t), ":") {
			colon = 1
		}
		d.cut(block, t, colon)
	}
}

// cut takes the first bytes and the blanks behind them off a text.
func (d *Draft) cut(block ast.Node, t *ast.Text, size int) {
	t.Segment.Start += size
	for t.Segment.Start < t.Segment.Stop && util.IsSpace(d.source.Text[t.Segment.Start]) {
		t.Segment.Start++
	}
	if t.Segment.Start == t.Segment.Stop {
		block.RemoveChild(block, t)
	}
}

// splitLines parts a paragraph before each line that starts with a leading
// word.
func (d *Draft) splitLines(block ast.Node) {
	if block.Kind() != ast.KindParagraph {
		return
	}
	lines := block.Lines().Sliced(0, block.Lines().Len())
	used := 0 // lines that are dealt out
	part := block
	end := func(offset int) { // of the part's lines
		from := used
		for used < len(lines) && lines[used].Start < offset {
			used++
		}
		own := text.NewSegments()
		own.AppendAll(lines[from:used])
		part.SetLines(own)
	}
	for n := block.FirstChild(); n != nil; {
		next := n.NextSibling()
		if part != block {
			part.AppendChild(part, n)
		}
		if t, ok := n.(*ast.Text); ok && (t.SoftLineBreak() || t.HardLineBreak()) && d.leadWord(next) != "" {
			t.SetSoftLineBreak(false)
			t.SetHardLineBreak(false)
			end(t.Segment.Stop)
			after := ast.NewParagraph()
			block.Parent().InsertAfter(block.Parent(), part, after)
			part = after
		}
		n = next
	}
	if part != block {
		end(len(d.source.Text) + 1)
	}
}
