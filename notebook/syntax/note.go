package syntax

import (
	"gusset/notebook/diag"
)

// noteAt reads the note whose `#` stands at i. A last `[…]` in it is its
// source; brackets inside that bracket belong to it.
func (p *parser) noteAt(i, end int) Note {
	from := i
	for from < end && p.s[from] == '#' {
		from++
	}
	t := trimmed(p.s, from, end)
	n := Note{At: p.span(i, max(t.End, from)), Text: p.s[t.Start:t.End]}
	if t.Start == t.End || p.s[t.End-1] != ']' {
		return n
	}
	open := 0
	for j := t.End - 1; j >= t.Start; j-- {
		switch p.s[j] {
		case ']':
			open++
		case '[':
			open--
		}
		if open == 0 {
			source := trimmed(p.s, j+1, t.End-1)
			text := trimmed(p.s, t.Start, j)
			n.Text, n.Source = p.s[text.Start:text.End], p.s[source.Start:source.End]
			n.SourceAt = p.span(source.Start, source.End)
			return n
		}
	}
	return n
}

// isSet tells whether there is a note.
func (n Note) isSet() bool { return n.At != diag.Span{} }
