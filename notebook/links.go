package notebook

import (
	"bytes"
	"fmt"
	"net/url"
	"path"
	"slices"
	"strings"
	"unicode/utf8"

	"github.com/yuin/goldmark/ast"
	"github.com/yuin/goldmark/text"
	"github.com/yuin/goldmark/util"

	"gusset/notebook/diag"
)

// linkSchemes are where a link may lead. Any other scheme runs something or
// reads the reader's own disk.
var linkSchemes = []string{"http", "https", "mailto", "tel"}

// checkLinks takes links that lead where none may out of the tree, and
// loads the images. A link's destination is then ready to be printed, an image's is
// its path within the root.
func (d *Draft) checkLinks() {
	var list []ast.Node
	for n := range nodes(d.doc) {
		switch n.(type) {
		case *ast.Link, *ast.AutoLink, *ast.Image:
			list = append(list, n)
		}
	}
	for _, n := range list {
		switch n := n.(type) {
		case *ast.Link:
			target, scheme := destination(n.Destination)
			if scheme != "" && !slices.Contains(linkSchemes, scheme) {
				d.dropLink(n, n.Destination, scheme)
				unwrap(n)
				continue
			}
			n.Destination = util.URLEscape(target, false)
		case *ast.AutoLink:
			_, scheme := destination(n.URL(d.source.Text))
			if scheme != "" && !slices.Contains(linkSchemes, scheme) {
				label := n.Label(d.source.Text)
				d.dropLink(n, label, scheme)
				start := n.Pos() + 1
				t := ast.NewTextSegment(text.NewSegment(start, start+len(label)))
				t.SetRaw(true)
				replace(n, t)
			}
		case *ast.Image:
			d.placeImage(n)
		}
	}
}

// destination resolves the escapes and references of a link and finds its
// scheme, "" for a relative one. It resolves until nothing changes: what a
// second reader could still take for a scheme counts as one.
func destination(raw []byte) (target []byte, scheme string) {
	target = raw
	for range 5 {
		next := util.ResolveEntityNames(util.ResolveNumericReferences(util.UnescapePunctuations(target)))
		if bytes.Equal(next, target) {
			break
		}
		target = next
	}
	plain := strings.Map(func(r rune) rune {
		if r <= ' ' || hidden(r) {
			return -1
		}
		return r
	}, string(target))
	i := strings.IndexAny(plain, ":/?#")
	switch {
	case i < 0 || plain[i] != ':':
		return target, ""
	case i == 0:
		return target, ":" // no scheme at all: nothing that may be followed
	}
	return target, strings.ToLower(plain[:i])
}

func (d *Draft) dropLink(n ast.Node, raw []byte, scheme string) {
	d.diags = append(d.diags, diag.Diagnostic{
		Severity: diag.Warning, ID: diag.DroppedLink, Source: d.source, Span: d.linkSpan(n, raw),
		Message: fmt.Sprintf("`%s:` links are dropped; the text stays", clip(scheme)),
	})
}

// clip shortens the user's words for a message.
func clip(s string) string {
	const most = 60
	if runes := []rune(s); len(runes) > most {
		return string(runes[:most]) + "…"
	}
	return s
}

// linkSpan is where a link's destination stands, with its percent signs or
// without, or where the link starts if the destination stands elsewhere.
func (d *Draft) linkSpan(n ast.Node, raw []byte) diag.Span {
	start := min(max(n.Pos(), 0), len(d.source.Text))
	if l, ok := n.(*ast.Link); ok && l.Reference != nil {
		return diag.Span{Start: start, End: min(start+1, len(d.source.Text))}
	}
	const near = 4 << 10
	text := d.source.Text[start:min(start+near, len(d.source.Text))]
	at := diag.Span{Start: start, End: min(start+1, len(d.source.Text))}
	first := len(text)
	for _, spelled := range [][]byte{raw, []byte(unescapePath(string(raw)))} {
		if i := bytes.Index(text, spelled); i >= 0 && i < first && len(spelled) > 0 {
			first, at = i, diag.Span{Start: start + i, End: start + i + len(spelled)}
		}
	}
	return at
}

// placeImage loads an image of the root. One that cannot be shown leaves its
// alternative text.
func (d *Draft) placeImage(n *ast.Image) {
	target, scheme := destination(n.Destination)
	at := d.linkSpan(n, n.Destination)
	if scheme != "" || bytes.HasPrefix(target, []byte("//")) {
		d.diags = append(d.diags, diag.Diagnostic{
			Severity: diag.Warning, ID: diag.DroppedLink, Source: d.source, Span: at,
			Message: "an image is a file beside the calc; this one is dropped and its text stays",
			Hints:   []string{"save the image in the calc's folder and name it there"},
		})
		unwrap(n)
		return
	}
	ref, _, _ := strings.Cut(string(target), "?")
	ref, _, _ = strings.Cut(ref, "#")
	if ref == "" {
		d.diags = append(d.diags, diag.Diagnostic{
			ID: diag.MissingFile, Source: d.source, Span: at,
			Message: "the image names no file", Hints: []string{"write `![what it shows](photo.png)`"},
		})
		unwrap(n)
		return
	}
	file, f := d.within(path.Dir(d.Path), unescapePath(ref))
	if f == nil {
		f = d.image(file, unescapePath(ref))
	}
	if f != nil {
		d.diags = append(d.diags, f.at(d.source, at))
		unwrap(n)
		return
	}
	n.Destination = []byte(file)
}

// unescapePath resolves the percent signs of an address. What is no text then
// stays as it was.
func unescapePath(ref string) string {
	if plain, err := url.PathUnescape(ref); err == nil && utf8.ValidString(plain) && strings.IndexFunc(plain, hidden) < 0 {
		return plain
	}
	return ref
}
