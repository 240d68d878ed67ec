package pdf

import (
	"bytes"
	"strings"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/util"

	"gusset/notebook"
	"gusset/render/fonts"
)

// voice is the set of faces that running text is set in, with its size, its
// leading and its colour.
type voice struct {
	regular, italic, bold, boldItalic *fonts.Face
	size, leading                     float64
	colour                            colour
}

// The voices of a sheet: prose, the same in tables, and the notes beside
// formulas.
var (
	proseVoice = voice{fonts.Serif, fonts.SerifItalic, fonts.SerifSemiBold, fonts.SerifSemiBoldItalic, 10.5, 15.2, inkColour}
	tableVoice = voice{fonts.Serif, fonts.SerifItalic, fonts.SerifSemiBold, fonts.SerifSemiBoldItalic, 9.4, 13, inkColour}
	noteVoice  = voice{fonts.Sans, fonts.Sans, fonts.SansSemiBold, fonts.SansSemiBold, 8.2, 11.2, softColour}
	lineVoice  = voice{fonts.Sans, fonts.Sans, fonts.SansSemiBold, fonts.SansSemiBold, 8.2, 11.2, inkColour}
)

// codeScale brings the mono face, which is large for its size, down to the
// letters around it.
const codeScale = 0.9

func (v voice) style() style { return style{face: v.regular, size: v.size, colour: v.colour} }

// strong is the voice with its heavier faces throughout.
func (v voice) strong() voice {
	v.regular, v.italic = v.bold, v.boldItalic
	return v
}

func (v voice) in(c colour) voice { v.colour = c; return v }

// runningText turns the inline content of a node of the prose into a
// paragraph.
type runningText struct {
	doc    *document
	voice  voice
	p      *paragraph
	italic int
	bold   int
	link   string
}

func (d *document) inlines(n ast.Node, v voice) *paragraph {
	t := runningText{doc: d, voice: v, p: &paragraph{}}
	t.children(n)
	return t.p
}

func (t *runningText) children(n ast.Node) {
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		t.node(c)
	}
}

func (t *runningText) style() style {
	st := style{face: t.voice.regular, size: t.voice.size, colour: t.voice.colour, link: t.link}
	switch {
	case t.italic > 0 && t.bold > 0:
		st.face = t.voice.boldItalic
	case t.italic > 0:
		st.face = t.voice.italic
	case t.bold > 0:
		st.face = t.voice.bold
	}
	if t.link != "" {
		st.colour = markColour
	}
	return st
}

func (t *runningText) code() style {
	st := t.style()
	st.face, st.size = fonts.Mono, st.size*codeScale
	return st
}

func (t *runningText) node(n ast.Node) {
	switch n := n.(type) {
	case *ast.Text:
		t.text(n)
	case *ast.String:
		if n.IsRaw() || n.IsCode() {
			t.p.write(t.style(), string(n.Value))
		} else {
			t.p.write(t.style(), notebook.Unescape(n.Value))
		}
	case *ast.CodeSpan:
		t.codeSpan(n)
	case *ast.Emphasis:
		t.emphasis(n)
	case *ast.Link:
		t.linked(target(string(n.Destination)), func() { t.children(n) })
	case *ast.AutoLink:
		t.linked(autoTarget(n, t.doc.source), func() { t.p.write(t.style(), string(n.Label(t.doc.source))) })
	case *ast.Image:
		t.image(n)
	case *notebook.ValueNode:
		t.value(n.Index)
	default:
		t.children(n)
	}
}

func (t *runningText) text(n *ast.Text) {
	value := n.Segment.Value(t.doc.source)
	if n.IsRaw() {
		t.p.write(t.style(), string(value))
	} else {
		t.p.write(t.style(), notebook.Unescape(value))
	}
	switch {
	case n.HardLineBreak():
		t.p.end()
	case n.SoftLineBreak():
		t.p.blank(t.style())
	}
}

func (t *runningText) codeSpan(n *ast.CodeSpan) {
	for c := n.FirstChild(); c != nil; c = c.NextSibling() {
		switch c := c.(type) {
		case *ast.Text:
			value := c.Segment.Value(t.doc.source)
			if bytes.HasSuffix(value, []byte("\n")) {
				value = append(bytes.Clone(value[:len(value)-1]), ' ')
			}
			t.p.write(t.code(), string(value))
		case *ast.String:
			t.p.write(t.code(), string(c.Value))
		}
	}
}

func (t *runningText) emphasis(n *ast.Emphasis) {
	if n.Level >= 2 {
		t.bold++
		t.children(n)
		t.bold--
		return
	}
	t.italic++
	t.children(n)
	t.italic--
}

func (t *runningText) linked(to string, run func()) {
	before := t.link
	t.link = to
	run()
	t.link = before
}

// image sets a picture in a line of text, or the words that stand for it.
func (t *runningText) image(n *ast.Image) {
	im := t.doc.imageOf(n)
	if im == nil {
		t.p.write(t.style(), "["+t.doc.imageWords(n)+"]")
		return
	}
	w, h := im.fit(t.doc.widest(), t.doc.tallest())
	b := &box{width: w, ascent: h}
	b.ink.pictures = []picture{{0, -h, w, h, im}}
	t.p.place(t.style(), b)
}

func (t *runningText) value(index int) {
	for _, part := range t.doc.page.Values[index] {
		if part.Value == nil {
			t.p.write(t.style(), part.Words)
		} else {
			t.doc.formula(t.p, part.Value, t.style())
		}
	}
}

// target says where a link of the prose leads on paper: to a place in the
// document, or to an address that a reader may open. A file beside the calc is
// neither.
func target(dest string) string {
	if strings.HasPrefix(dest, "#") {
		return dest
	}
	for _, scheme := range []string{"http:", "https:", "mailto:", "tel:"} {
		if len(dest) > len(scheme) && strings.EqualFold(dest[:len(scheme)], scheme) {
			return dest
		}
	}
	return ""
}

func autoTarget(n *ast.AutoLink, source []byte) string {
	url := string(util.URLEscape(n.URL(source), false))
	if n.AutoLinkType == ast.AutoLinkEmail && !strings.HasPrefix(strings.ToLower(url), "mailto:") {
		url = "mailto:" + url
	}
	return target(url)
}
