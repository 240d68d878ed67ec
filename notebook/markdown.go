package notebook

import (
	"bytes"
	"iter"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/extension"
	"github.com/yuin/goldmark/parser"
	"github.com/yuin/goldmark/text"
	"github.com/yuin/goldmark/util"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// markdown is CommonMark with pipe tables and values in braces, without raw
// HTML, which stays text. It keeps nothing of what it parses.
var markdown = parser.NewParser(
	parser.WithBlockParsers(
		util.Prioritized(parser.NewSetextHeadingParser(), 100),
		util.Prioritized(parser.NewThematicBreakParser(), 200),
		util.Prioritized(nested{parser.NewListParser()}, 300),
		util.Prioritized(nested{parser.NewListItemParser()}, 400),
		util.Prioritized(parser.NewCodeBlockParser(), 500),
		util.Prioritized(measured{parser.NewATXHeadingParser()}, 600),
		util.Prioritized(fenceParser{parser.NewFencedCodeBlockParser()}, 700),
		util.Prioritized(nested{parser.NewBlockquoteParser()}, 800),
		util.Prioritized(measured{parser.NewParagraphParser()}, 1000),
	),
	parser.WithInlineParsers(
		util.Prioritized(parser.NewCodeSpanParser(), 100),
		util.Prioritized(valueParser{}, 150),
		util.Prioritized(marked{parser.NewLinkParser()}, 200),
		util.Prioritized(parser.NewAutoLinkParser(), 300),
		util.Prioritized(marked{parser.NewEmphasisParser()}, 500),
	),
	parser.WithParagraphTransformers(
		util.Prioritized(parser.LinkReferenceParagraphTransformer, 100),
		util.Prioritized(newTables(), 200),
	),
	parser.WithASTTransformers(util.Prioritized(extension.NewTableASTTransformer(), 0)),
)

// reading is what the parsers of one file leave beside the tree.
type reading struct {
	src    *diag.Source
	fences map[ast.Node]*fence
	texts  []syntax.ValueRef
	diags  []diag.Diagnostic
	bounds map[string]bool // those that were reported as exceeded
	// marks counts the signs of emphasis and links in the paragraph marksIn.
	marks   int
	marksIn ast.Node
}

var readingKey = parser.NewContextKey()

func readingOf(pc parser.Context) *reading { return pc.Get(readingKey).(*reading) }

// blank returns a copy of a text with its first bytes blanked: every offset
// behind them stays what it was.
func blank(text []byte, body int) []byte {
	masked := bytes.Clone(text)
	for i := range masked[:body] {
		if masked[i] != '\n' {
			masked[i] = ' '
		}
	}
	return masked
}

// parseMarkdown reads the Markdown of a source from an offset on. Offsets in
// the tree are offsets into the source.
func parseMarkdown(src *diag.Source, body int) (ast.Node, *reading) {
	r := &reading{src: src, fences: map[ast.Node]*fence{}, bounds: map[string]bool{}}
	pc := parser.NewContext()
	pc.Set(readingKey, r)
	doc := markdown.Parse(text.NewReader(blank(src.Text, body)), parser.WithContext(pc))
	r.prune(doc)
	return doc, r
}

// parse reads the Markdown behind the front matter.
func (d *Draft) parse(body int) {
	doc, r := parseMarkdown(d.source, body)
	d.doc, d.texts = doc, r.texts
	d.blocks = r.placeFences(doc)
	d.diags = append(d.diags, r.diags...)
	d.checkLinks()
	d.findRemarks()
}

// nodes goes through a tree in document order, without recursion. The tree may
// change behind the node at hand, and the node itself may be taken out once its
// children have been dealt with.
func nodes(root ast.Node) iter.Seq2[ast.Node, int] {
	return func(yield func(ast.Node, int) bool) {
		depth := 0
		for n := root; n != nil; {
			if !yield(n, depth) {
				return
			}
			if c := n.FirstChild(); c != nil {
				n = c
				depth++
				continue
			}
			for n != root && n.NextSibling() == nil {
				n = n.Parent()
				depth--
			}
			if n == root {
				return
			}
			n = n.NextSibling()
		}
	}
}

// prune cuts off what nests too deep, so that everything behind may walk the
// tree by recursion.
func (r *reading) prune(doc ast.Node) {
	for n, depth := range nodes(doc) {
		if depth > 2*maxNesting && n.HasChildren() {
			r.exceeded(n.Pos(), tooDeep, maxNesting)
			n.RemoveChildren(n)
		}
	}
}

// valueParser finds `{name}` and `{name [unit]}` in text. Everything else in
// braces is text.
type valueParser struct{}

func (valueParser) Trigger() []byte { return []byte{'{'} }

func (valueParser) Parse(_ ast.Node, block text.Reader, pc parser.Context) ast.Node {
	line, at := block.PeekLine()
	end := bytes.IndexAny(line[1:], "{}\n")
	if end < 0 || line[1+end] != '}' {
		return nil
	}
	size := end + 2
	r := readingOf(pc)
	ref, ok, bad := syntax.ParseValueRef(r.src, diag.Span{Start: at.Start, End: at.Start + size})
	if bad != nil {
		r.diags = append(r.diags, *bad)
	}
	if !ok {
		return nil
	}
	block.Advance(size)
	r.texts = append(r.texts, ref)
	return &ValueNode{Index: len(r.texts) - 1}
}

// replace puts nodes in the place of another.
func replace(old ast.Node, with ...ast.Node) {
	parent := old.Parent()
	for _, n := range with {
		parent.InsertBefore(parent, old, n)
	}
	parent.RemoveChild(parent, old)
}

// unwrap puts a node's children in its place.
func unwrap(n ast.Node) {
	var children []ast.Node
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		children = append(children, c)
	}
	n.RemoveChildren(n)
	replace(n, children...)
}
