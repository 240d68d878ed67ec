package diag

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Text returns the diagnostic as it stands on a terminal:
//
//	lug.md:24:13: tau is declared in MPa (stress), but P/d is a force per length (kN/mm)
//	   24 | tau [MPa] = P/d
//	      |             ^^^
//	   a length is missing in the denominator; lengths in scope: d, t, w
//
// Warnings and notes say so before the message.
func (d Diagnostic) Text() string {
	var b strings.Builder
	word := ""
	if d.Severity != Error {
		word = d.Severity.String() + ": "
	}
	if d.Source == nil {
		fmt.Fprintf(&b, "%s%s\n", word, d.Message)
		for _, h := range d.Hints {
			fmt.Fprintf(&b, "   %s\n", h)
		}
		return b.String()
	}
	line, column := d.Source.Position(d.Span.Start)
	fmt.Fprintf(&b, "%s:%d:%d: %s%s\n", Visible(d.Source.Name), line, column, word, d.Message)
	if text := d.Source.Line(line); strings.TrimSpace(text) != "" {
		writeExcerpt(&b, d, line, text)
	}
	for _, h := range d.Hints {
		fmt.Fprintf(&b, "   %s\n", h)
	}
	return b.String()
}

// excerptWidth bounds the source shown, so that one very long line does not
// fill the terminal: a cut is marked by an ellipsis.
const excerptWidth = 100

func writeExcerpt(b *strings.Builder, d Diagnostic, line int, text string) {
	start := d.Span.Start - d.Source.LineStart(line)
	end := min(max(d.Span.End-d.Source.LineStart(line), start), len(text))
	start = min(start, len(text))
	left, right := "", ""
	if from := runesBefore(text, start, excerptWidth-30); from > 0 {
		left, text, start, end = "…", text[from:], start-from, end-from
	}
	if to := runesAfter(text, start, excerptWidth); to < len(text) {
		right, text, end = "…", text[:to], min(end, to)
	}
	fmt.Fprintf(b, "%5d | %s%s%s\n", line, left, Visible(text), right)
	pad := strings.Repeat(" ", Width(left)) + blank(text[:start])
	fmt.Fprintf(b, "      | %s%s\n", pad, strings.Repeat("^", max(Width(text[start:end]), 1)))
}

// runesBefore returns the offset n code points before the offset at, or 0.
func runesBefore(s string, at, n int) int {
	for ; at > 0 && n > 0; n-- {
		_, size := utf8.DecodeLastRuneInString(s[:at])
		at -= size
	}
	return at
}

func runesAfter(s string, at, n int) int {
	for ; at < len(s) && n > 0; n-- {
		_, size := utf8.DecodeRuneInString(s[at:])
		at += size
	}
	return at
}

// Visible replaces control characters and direction marks by a replacement
// mark, so that a file from outside cannot steer the terminal or reorder a line.
func Visible(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\t':
			return ' '
		case unicode.IsControl(r) || unicode.Is(unicode.Bidi_Control, r):
			return '\uFFFD'
		}
		return r
	}, s)
}

// Width is the number of terminal cells a text takes.
func Width(s string) int {
	n := 0
	for _, r := range s {
		n += runeWidth(r)
	}
	return n
}

func blank(s string) string { return strings.Repeat(" ", Width(s)) }

// runeWidth is the number of terminal cells a code point takes: none for a
// combining mark, two for the wide blocks of East Asian text and pictographs.
func runeWidth(r rune) int {
	switch {
	case unicode.Is(unicode.Mn, r) || unicode.Is(unicode.Me, r) || r == '\u200d' || r == '\ufe0f':
		return 0
	case r >= 0x1100 && (r <= 0x115f || r >= 0x2e80 && r <= 0xa4cf || r >= 0xac00 && r <= 0xd7a3 ||
		r >= 0xf900 && r <= 0xfaff || r >= 0xfe30 && r <= 0xfe6f || r >= 0xff00 && r <= 0xff60 ||
		r >= 0xffe0 && r <= 0xffe6 || r >= 0x1f300 && r <= 0x1faff || r >= 0x20000 && r <= 0x3fffd):
		return 2
	}
	return 1
}

// JSON is the form of a diagnostic for a machine. Line and columns count from
// 1, columns in Unicode code points, the end exclusive.
type JSON struct {
	Severity  string   `json:"severity"`
	ID        string   `json:"id"`
	Message   string   `json:"message"`
	Hints     []string `json:"hints,omitempty"`
	File      string   `json:"file"`
	Line      int      `json:"line"`
	Column    int      `json:"column"`
	EndColumn int      `json:"end_column"`
}

// JSON returns the diagnostic's form for a machine. A span that runs over
// several lines ends at its first line's end.
func (d Diagnostic) JSON() JSON {
	j := JSON{Severity: d.Severity.String(), ID: d.ID, Message: d.Message, Hints: d.Hints, Line: 1, Column: 1, EndColumn: 1}
	if d.Source == nil {
		return j
	}
	j.File = d.Source.Name
	j.Line, j.Column = d.Source.Position(d.Span.Start)
	line, column := d.Source.Position(max(d.Span.End, d.Span.Start))
	if line != j.Line {
		column = utf8.RuneCountInString(d.Source.Line(j.Line)) + 1
	}
	j.EndColumn = max(column, j.Column)
	return j
}
