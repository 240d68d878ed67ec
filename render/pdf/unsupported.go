package pdf

import (
	"fmt"
	"strings"
	"unicode/utf8"

	"gusset/notebook/diag"
	"gusset/render"
	"gusset/render/fonts"
)

// Unsupported warns of the characters of a calc that none of the faces has and
// that a PDF can show only as their codes: each once, where it first stands.
func Unsupported(p *render.Page) []diag.Diagnostic {
	src := p.Sheet.Source
	var out []diag.Diagnostic
	seen := map[rune]bool{}
	for at := 0; at < len(src.Text); {
		if src.Text[at] < utf8.RuneSelf {
			at++
			continue
		}
		r, size := utf8.DecodeRune(src.Text[at:])
		here := diag.Span{Start: at, End: at + size}
		at += size
		if seen[r] || printable(r) || silent(src, here) {
			continue
		}
		seen[r] = true
		out = append(out, diag.Diagnostic{
			Severity: diag.Warning, ID: diag.UnsupportedCharacter, Source: src, Span: here,
			Message: fmt.Sprintf("no face has the character %s; a PDF shows its code", codeText(r)),
			Hints:   []string{"write it in words"},
		})
	}
	return out
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
