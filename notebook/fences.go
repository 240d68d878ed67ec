package notebook

import (
	"bytes"
	"fmt"
	"slices"
	"strings"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/parser"
	"github.com/yuin/goldmark/text"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// fence is a fenced block as it stands in the file, whether ours or not.
type fence struct {
	node   *ast.FencedCodeBlock
	mark   byte // ` or ~
	length int
	at     diag.Span // from the opening marks to the end of the last line
	info   diag.Span // what follows the marks in the opening line
	closed bool
	ours   bool
}

var markWords = map[byte]string{'`': "backticks", '~': "tildes"}

// fenceParser reads fenced blocks as Markdown has them, and besides finds the
// ones that are never closed. Markdown would take the next fence for content,
// and all prose up to it; here a line that opens a fence ends one of ours.
type fenceParser struct{ parser.BlockParser }

func (p fenceParser) Open(parent ast.Node, reader text.Reader, pc parser.Context) (ast.Node, parser.State) {
	line, seg := reader.PeekLine()
	pos := max(pc.BlockOffset(), 0)
	r := readingOf(pc)
	start := seg.Start - seg.Padding + pos
	end := start + len(bytes.TrimRight(line[pos:], " \t\r\n"))
	node, state := p.BlockParser.Open(parent, reader, pc)
	mark, length, info := fenceMarks(line[pos:])
	if node == nil {
		if length >= 3 && strings.Contains(info, "`") && syntax.IsOurs(info) {
			r.diags = append(r.diags, diag.Diagnostic{
				ID: diag.Syntax, Source: r.src, Span: diag.Span{Start: start, End: end},
				Message: "a fence's line may hold no backtick, so this opens no block",
				Hints:   []string{"leave the backticks out of the note"},
			})
		}
		return nil, state
	}
	r.fences[node] = &fence{
		node: node.(*ast.FencedCodeBlock), mark: mark, length: length, ours: syntax.IsOurs(info),
		at: diag.Span{Start: start, End: end}, info: diag.Span{Start: start + length, End: end},
	}
	return node, state
}

func (p fenceParser) Continue(node ast.Node, reader text.Reader, pc parser.Context) parser.State {
	line, seg := reader.PeekLine()
	f := readingOf(pc).fences[node]
	if mark, length, info := fenceMarks(bytes.TrimLeft(line, " \t")); mark == f.mark && length >= f.length && info != "" &&
		(f.ours || syntax.IsOurs(info)) {
		return parser.Close
	}
	state := p.BlockParser.Continue(node, reader, pc)
	f.closed = state&parser.Continue == 0
	f.at.End = max(f.at.End, seg.Start+len(bytes.TrimRight(line, "\r\n"))-seg.Padding)
	return state
}

// fenceMarks splits a line into the marks of a fence and what follows them.
func fenceMarks(line []byte) (mark byte, length int, info string) {
	if len(line) == 0 || line[0] != '`' && line[0] != '~' {
		return 0, 0, ""
	}
	mark = line[0]
	for length < len(line) && line[length] == mark {
		length++
	}
	return mark, length, string(bytes.Trim(line[length:], " \t\r\n"))
}

// placeFences parses the fences of ours in document order and puts a FenceNode
// in the place of each.
func (r *reading) placeFences(doc ast.Node) []*syntax.Block {
	var ours []*fence
	for n := range nodes(doc) {
		f := r.fences[n]
		if f == nil {
			continue
		}
		if !f.closed {
			r.diags = append(r.diags, diag.Diagnostic{
				ID: diag.Syntax, Source: r.src, Span: diag.Span{Start: f.at.Start, End: f.info.End},
				Message: "this fence is never closed",
				Hints:   []string{fmt.Sprintf("a line of %d %s ends it", f.length, markWords[f.mark])},
			})
		}
		if f.ours {
			ours = append(ours, f)
		} else if kind, at := syntax.Meant(string(r.src.Text[f.info.Start:f.info.End])); kind != "" {
			r.diags = append(r.diags, diag.Diagnostic{
				ID: diag.Syntax, Severity: diag.Warning, Source: r.src,
				Span:    diag.Span{Start: f.info.Start + at.Start, End: f.info.Start + at.End},
				Message: "a block's kind is written in small letters; as it stands this is code, and nothing in it is computed",
				Hints:   []string{"did you mean `" + kind + "`?"},
			})
		}
	}
	blocks, reader := make([]*syntax.Block, len(ours)), syntax.NewReader(r.src, len(r.src.Text))
	for i, f := range ours {
		block, diags := reader.Block(f.info, f.at, f.lines(r.src))
		if !f.closed {
			diags = f.beforeBlank(r.src, diags)
		}
		r.diags = append(r.diags, diags...)
		blocks[i] = block
		node := &FenceNode{Index: i}
		node.SetPos(f.at.Start)
		replace(f.node, node)
	}
	return blocks
}

// lines are the fence's content. Within quotes and lists they do not follow
// each other in the file without a gap.
func (f *fence) lines(src *diag.Source) []syntax.Line {
	segments := f.node.Lines()
	lines := make([]syntax.Line, segments.Len())
	for i := range lines {
		s := segments.At(i)
		end := s.Start + len(bytes.TrimRight(src.Text[s.Start:s.Stop], "\r\n"))
		lines[i] = syntax.Line{Start: s.Start, End: end}
	}
	return lines
}

// beforeBlank keeps the diagnostics above the first blank line of a fence that
// is never closed. What stands below is most likely prose, and its one mistake
// has been reported.
func (f *fence) beforeBlank(src *diag.Source, diags []diag.Diagnostic) []diag.Diagnostic {
	for _, l := range f.lines(src) {
		if len(bytes.TrimSpace(src.Text[l.Start:l.End])) == 0 {
			return slices.DeleteFunc(diags, func(d diag.Diagnostic) bool { return d.Span.Start >= l.Start })
		}
	}
	return diags
}
