package notebook

import (
	"fmt"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// readHelpers reads the files of the author's own helpers.
func (d *Draft) readHelpers() {
	for _, l := range d.front.Helpers {
		h := &check.HelperFile{Key: l.Key, Path: l.Path, Line: d.source.LineAt(l.At.Start)}
		d.helpers = append(d.helpers, h)
		if l.Path == "" {
			h.Failed = true
			continue
		}
		src, f := d.file(l.Path)
		if f != nil {
			d.diags = append(d.diags, f.of(d.source.Slice(l.At)).at(d.source, l.At))
			h.Failed = true
			continue
		}
		helpers, diags := readHelperFile(src)
		d.diags = append(d.diags, diags...)
		h.Helpers = helpers
	}
}

// readHelperFile reads the helper blocks of a file. Its prose is for its own
// readers; a block of another kind has no place in it.
func readHelperFile(src *diag.Source) ([]*syntax.Helper, []diag.Diagnostic) {
	_, body, _ := cutFront(src.Text)
	doc, r := parseMarkdown(src, body)
	blocks := r.placeFences(doc)
	diags := r.diags
	var helpers []*syntax.Helper
	for _, b := range blocks {
		switch {
		case b.Kind != syntax.HelperBlock:
			diags = append(diags, diag.Diagnostic{
				ID: diag.Syntax, Source: src, Span: firstLine(src, b.At),
				Message: fmt.Sprintf("a file of helpers holds no %s block", b.Kind),
				Hints:   []string{"helper blocks and prose only"},
			})
		case b.Helper != nil:
			helpers = append(helpers, b.Helper)
		}
	}
	diag.Sort(diags)
	return helpers, diags
}

// firstLine is the part of a span that stands in its first line.
func firstLine(src *diag.Source, at diag.Span) diag.Span {
	line := src.LineAt(at.Start)
	return diag.Span{Start: at.Start, End: min(at.End, src.LineStart(line)+len(src.Line(line)))}
}
