package pdf

import (
	"bytes"
	"fmt"
	"strings"
	"unicode/utf8"

	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/render"
	"gusset/render/fonts"
)

// Unsupported warns of the characters of a calc that none of the faces has and
// that a PDF can show only as their codes: each once, where it first stands. What
// other files bring in is told where the calc takes it from them, and of a
// helper's lines where they stand.
func Unsupported(p *render.Page) []diag.Diagnostic {
	src := p.Sheet.Source
	c := &codes{seen: map[rune]bool{}}
	for at := 0; at < len(src.Text); {
		if src.Text[at] < utf8.RuneSelf {
			at++
			continue
		}
		r, size := utf8.DecodeRune(src.Text[at:])
		here := diag.Span{Start: at, End: at + size}
		at += size
		if !silent(src, here) {
			c.report(r, src, here)
		}
	}
	for _, b := range p.Sheet.Blocks {
		for _, s := range b.Steps {
			at := b.Tree.At
			if s.Stmt != nil {
				at = s.Stmt.Span()
			}
			if s.Origin != nil {
				c.text(s.Origin.Name(), src, at)
			}
			c.text(s.Symbol, src, at)
			for _, t := range s.Value.Text {
				c.text(t, src, at)
			}
			c.calls(s.Calls)
		}
	}
	f := p.Sheet.Front
	for _, t := range []string{f.Firm, f.Client, f.Project, f.Job} { // the register may set them
		c.text(t, src, diag.Span{})
	}
	return c.found
}

// codes gathers the characters that are shown as codes, each once. Those of one
// word or phrase are one warning.
type codes struct {
	seen  map[rune]bool
	last  []rune // those that the last warning names
	found []diag.Diagnostic
}

func (c *codes) report(r rune, src *diag.Source, at diag.Span) {
	if r < utf8.RuneSelf || printable(r) {
		return
	}
	known := c.seen[r]
	c.seen[r] = true
	if n := len(c.found); n > 0 && c.found[n-1].Source == src {
		if d := &c.found[n-1]; at.Start > d.Span.Start && at.Start <= d.Span.End+1 && src.LineAt(at.Start) == src.LineAt(d.Span.Start) {
			d.Span.End = at.End
			if !known {
				c.last = append(c.last, r)
				d.Message = noFace(c.last)
			}
			return
		}
	}
	if known {
		return
	}
	c.last = []rune{r}
	c.found = append(c.found, diag.Diagnostic{
		Severity: diag.Warning, ID: diag.UnsupportedCharacter, Source: src, Span: at,
		Message: noFace(c.last),
		Hints:   []string{"write it in words"},
	})
}

// noFace says which characters have no face, by the codes of the first ones.
func noFace(list []rune) string {
	const most = 4
	if len(list) == 1 {
		return fmt.Sprintf("no face has the character %s; a PDF shows its code", codeText(list[0]))
	}
	var names []string
	for _, r := range list[:min(most, len(list))] {
		names = append(names, codeText(r))
	}
	end := ""
	if len(list) > most {
		end = fmt.Sprintf(" and %d more", len(list)-most)
	}
	return fmt.Sprintf("no face has the characters %s%s; a PDF shows their codes", strings.Join(names, ", "), end)
}

// text reports a text that comes from another file, at the place that asks for it.
func (c *codes) text(s string, src *diag.Source, at diag.Span) {
	for _, r := range s {
		c.report(r, src, at)
	}
}

// calls reports what helpers print of themselves.
func (c *codes) calls(calls []*eval.Call) {
	for _, call := range calls {
		h := call.Helper
		texts := append([]string{}, call.Cautions...)
		if h != nil {
			texts = append(texts, h.Note.Text, h.Note.Source)
		}
		for _, s := range call.Steps {
			texts = append(texts, s.Symbol, s.Note, s.Source)
			texts = append(texts, s.Value.Text...)
			c.calls(s.Calls)
		}
		if h == nil {
			continue // a function of the author's own stands in the calc
		}
		for _, t := range texts {
			for _, r := range t {
				at := diag.Span{Start: h.At.Start, End: h.At.End}
				if i := bytes.IndexRune(h.Source.Text[h.At.Start:], r); i >= 0 {
					at = diag.Span{Start: h.At.Start + i, End: h.At.Start + i + utf8.RuneLen(r)}
				}
				c.report(r, h.Source, at)
			}
		}
	}
}

// printable reports whether a character, by itself or composed with what may
// stand before it, comes out as more than a code.
func printable(r rune) bool {
	for _, s := range spans(fonts.Serif, string(r)) {
		if s.code != 0 {
			return false
		}
	}
	return true
}

// silent reports whether a place stands in a line that is never printed.
func silent(src *diag.Source, at diag.Span) bool {
	return strings.HasPrefix(strings.TrimSpace(src.Line(src.LineAt(at.Start))), "//")
}
