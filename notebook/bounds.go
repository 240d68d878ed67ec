package notebook

import (
	"bytes"
	"fmt"
	"unicode/utf8"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/extension"
	"github.com/yuin/goldmark/parser"
	"github.com/yuin/goldmark/text"

	"gusset/notebook/diag"
)

// The bounds on prose. The Markdown parser takes time that grows with the
// square of what one paragraph holds, so that a file made to do harm could stop the
// program; no paragraph that somebody reads comes near them.
const (
	maxNesting   = 100       // quotes and lists in each other; a browser stops at 512 elements
	maxLine      = 64 << 10  // bytes of one line
	maxParagraph = 256 << 10 // bytes of a paragraph, or of a table before it is parted
	maxMarks     = 1000      // signs of emphasis and links in a paragraph
	maxColumns   = 100       // of a table
)

// exceeded reports that a bound was met, each bound once.
func (r *reading) exceeded(at int, format string, bound int) {
	message := fmt.Sprintf(format, bound)
	if r.bounds[message] {
		return
	}
	r.bounds[message] = true
	at = min(max(at, 0), len(r.src.Text))
	r.diags = append(r.diags, diag.Diagnostic{
		ID: diag.BoundExceeded, Source: r.src, Span: diag.Span{Start: at, End: min(at+1, len(r.src.Text))}, Message: message,
	})
}

const tooDeep = "quotes, lists and marked text may nest %d deep at most"

// nested is a block parser that opens no block below maxNesting others.
type nested struct{ parser.BlockParser }

func (b nested) Open(parent ast.Node, reader text.Reader, pc parser.Context) (ast.Node, parser.State) {
	depth := 0
	for n := parent; n != nil && depth <= maxNesting; n = n.Parent() {
		depth++
	}
	if depth > maxNesting {
		_, at := reader.Position()
		readingOf(pc).exceeded(at.Start, tooDeep, maxNesting)
		return nil, parser.NoChildren
	}
	return b.BlockParser.Open(parent, reader, pc)
}

// measured is a block parser whose blocks hold no more text than the bounds.
type measured struct{ parser.BlockParser }

func (b measured) Open(parent ast.Node, reader text.Reader, pc parser.Context) (ast.Node, parser.State) {
	node, state := b.BlockParser.Open(parent, reader, pc)
	if node != nil {
		readingOf(pc).measure(node.Lines())
	}
	return node, state
}

func (b measured) Continue(node ast.Node, reader text.Reader, pc parser.Context) parser.State {
	state := b.BlockParser.Continue(node, reader, pc)
	readingOf(pc).measure(node.Lines())
	return state
}

// measure cuts the line that was read last, or leaves it out.
func (r *reading) measure(lines *text.Segments) {
	if lines.Len() == 0 {
		return
	}
	last := lines.At(lines.Len() - 1)
	if last.Len() > maxLine {
		r.exceeded(last.Start, "a line of text may have %d bytes at most", maxLine)
		for last.Stop = last.Start + maxLine; !utf8.RuneStart(r.src.Text[last.Stop]); {
			last.Stop--
		}
		lines.Set(lines.Len()-1, last)
	}
	if last.Stop-lines.At(0).Start > maxParagraph {
		r.exceeded(last.Start, "a paragraph or table may have %d bytes at most", maxParagraph)
		lines.SetSliced(0, lines.Len()-1)
	}
}

// marked is an inline parser that takes no more than maxMarks signs in one
// paragraph; further ones are text.
type marked struct{ parser.InlineParser }

func (p marked) Parse(parent ast.Node, block text.Reader, pc parser.Context) ast.Node {
	line, at := block.PeekLine()
	if line[0] != '!' || bytes.HasPrefix(line, []byte("![")) {
		r := readingOf(pc)
		if r.marksIn != parent {
			r.marksIn, r.marks = parent, 0
		}
		if r.marks++; r.marks > maxMarks {
			r.exceeded(at.Start, "a paragraph may have %d signs of emphasis and links at most", maxMarks)
			return nil
		}
	}
	return p.InlineParser.Parse(parent, block, pc)
}

// CloseBlock ends the links that were begun in a paragraph.
func (p marked) CloseBlock(parent ast.Node, block text.Reader, pc parser.Context) {
	if c, ok := p.InlineParser.(parser.CloseBlocker); ok {
		c.CloseBlock(parent, block, pc)
	}
}

// tables finds tables in paragraphs. Each row of a table is filled up to the
// columns of its head, so that a wide head makes many cells.
type tables struct{ parser.ParagraphTransformer }

func newTables() tables { return tables{extension.NewTableParagraphTransformer()} }

func (t tables) Transform(node *ast.Paragraph, reader text.Reader, pc parser.Context) {
	lines := node.Lines()
	for i := 1; i < lines.Len(); i++ {
		s := lines.At(i)
		line := bytes.TrimSpace(s.Value(reader.Source()))
		if bytes.Count(line, []byte("|")) > maxColumns+1 && len(bytes.Trim(line, "|-: \t")) == 0 {
			readingOf(pc).exceeded(s.Start, "a table may have %d columns at most", maxColumns)
			return
		}
	}
	t.ParagraphTransformer.Transform(node, reader, pc)
}
