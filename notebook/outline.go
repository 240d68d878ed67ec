package notebook

import (
	"fmt"
	"strconv"
	"strings"
	"unicode"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/util"
)

// sections numbers headings: a heading is a part of the nearest one above it
// that stands further out. The outermost level in use, whatever its marks, is
// 1, and a level that is left out is not counted.
type sections struct {
	levels []int // the Markdown levels of the open headings, outermost first
	counts []int // how many headings each level has had
}

// next returns the level and the number of the next heading.
func (s *sections) next(level int) (depth int, number string) {
	keep := len(s.levels)
	for keep > 0 && s.levels[keep-1] >= level {
		keep--
	}
	s.levels = append(s.levels[:keep], level)
	if keep < len(s.counts) {
		s.counts = s.counts[:keep+1]
	} else {
		s.counts = append(s.counts, 0)
	}
	s.counts[keep]++
	parts := make([]string, keep+1)
	for i, n := range s.counts[:keep+1] {
		parts[i] = strconv.Itoa(n)
	}
	return keep + 1, strings.Join(parts, ".")
}

// equations numbers what a checker refers to: `1.4` is the fourth in the first
// top-level section, a plain `4` stands before any.
type equations struct {
	section string
	count   int
}

func (e *equations) enter(section string) { e.section, e.count = section, 0 }

func (e *equations) next() string {
	e.count++
	if e.section == "" {
		return strconv.Itoa(e.count)
	}
	return e.section + "." + strconv.Itoa(e.count)
}

// anchors gives out ids, each once. It holds, for each id given, the figure to
// try next for another of its name.
type anchors map[string]int

func (a anchors) take(name string) string {
	id := name
	for a[id] > 0 {
		a[name]++
		id = fmt.Sprintf("%s-%d", name, a[name])
	}
	a[id] = 1
	return id
}

// slug is the anchor of a heading's text: lower case, words joined by hyphens,
// other marks dropped.
func slug(text string) string {
	var b strings.Builder
	for _, r := range strings.ToLower(strings.TrimSpace(text)) {
		switch {
		case unicode.IsLetter(r) || unicode.IsDigit(r) || unicode.IsMark(r) || r == '_' || r == '-':
			b.WriteRune(r)
		case unicode.IsSpace(r):
			b.WriteByte('-')
		}
	}
	if b.Len() == 0 {
		return "section"
	}
	return b.String()
}

// plain joins the text of the inline nodes below n. value gives the text of a
// value by its index.
func plain(n ast.Node, source []byte, value func(index int) string) string {
	var b strings.Builder
	writePlain(&b, n, source, value)
	return strings.Join(strings.Fields(b.String()), " ")
}

func writePlain(b *strings.Builder, n ast.Node, source []byte, value func(index int) string) {
	switch n := n.(type) {
	case *ast.Text:
		if n.IsRaw() || n.Parent() != nil && n.Parent().Kind() == ast.KindCodeSpan {
			b.Write(n.Segment.Value(source))
		} else {
			b.WriteString(Unescape(n.Segment.Value(source)))
		}
		if n.SoftLineBreak() || n.HardLineBreak() {
			b.WriteByte(' ')
		}
	case *ast.String:
		b.Write(n.Value)
	case *ast.AutoLink:
		b.Write(n.Label(source))
	case *ast.CodeBlock, *ast.FencedCodeBlock:
		for _, line := range n.Lines().Sliced(0, n.Lines().Len()) {
			b.Write(line.Value(source))
		}
	case *ValueNode:
		b.WriteString(value(n.Index))
	}
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		if c.Type() == ast.TypeBlock && c != n.FirstChild() {
			b.WriteByte(' ')
		}
		writePlain(b, c, source, value)
	}
}

// Unescape resolves the backslashes and character references of Markdown text,
// as a page shows it.
func Unescape(raw []byte) string {
	var b strings.Builder
	for i := 0; i < len(raw); i++ {
		switch c := raw[i]; {
		case c == '\\' && i+1 < len(raw) && util.IsPunct(raw[i+1]):
			i++
			b.WriteByte(raw[i])
		case c == '&':
			end := i + 1
			for end < len(raw) && end-i < 40 && (raw[end] == '#' || util.IsAlphaNumeric(raw[end])) {
				end++
			}
			if end < len(raw) && raw[end] == ';' {
				b.Write(util.ResolveEntityNames(util.ResolveNumericReferences(raw[i : end+1])))
				i = end
				continue
			}
			b.WriteByte(c)
		default:
			b.WriteByte(c)
		}
	}
	return b.String()
}
