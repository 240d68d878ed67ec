package syntax

import (
	"strings"
	"unicode/utf8"
)

// readStatement finds the lines of the statement that starts at line p.next
// and fills segs and note. A statement goes on in the next line while a
// bracket is open or the line ends in an operator or a comma, its note taken
// off first. It stops all the same before a blank line, a `//` line and a line
// that begins another statement, so that a bracket that was forgotten costs one
// statement, not the rest of the block.
func (p *parser) readStatement() {
	p.segs = p.segs[:0]
	p.note = Note{}
	open := 0
	for {
		line := p.lines[p.next]
		p.next++
		seg, note := p.takeNote(line, &open)
		if note < line.End && p.note.At.End == 0 {
			p.note = p.noteAt(note, line.End)
		}
		if seg.Start < seg.End || len(p.segs) == 0 {
			p.segs = append(p.segs, seg)
		}
		last := p.segs[len(p.segs)-1]
		if open <= 0 && !endsOpen(p.s[last.Start:last.End]) {
			return
		}
		if p.next >= len(p.lines) || p.stopsBefore(p.lines[p.next], open > 0, p.s[last.Start:last.End]) {
			return
		}
	}
}

// takeNote returns a line without blanks around and its note, and the offset
// of the note's `#`, or the line's end. It counts the brackets on the way. A
// `#` inside a quoted text is none; a `"` behind a figure is an inch mark.
func (p *parser) takeNote(line Line, open *int) (seg Line, note int) {
	s := p.s
	i, end := line.Start, line.End
	for i < end {
		if byteClass[s[i]]&lineByte == 0 {
			i++
			continue
		}
		switch s[i] {
		case '#':
			return trimmed(s, line.Start, i), i
		case '"':
			if i == line.Start || !isDigit(s[i-1]) {
				if n := strings.IndexByte(s[i+1:end], '"'); n >= 0 {
					i += n + 1
				} else {
					return trimmed(s, line.Start, end), end
				}
			}
		case '(', '[':
			*open++
		default:
			*open--
		}
		i++
	}
	return trimmed(s, line.Start, end), end
}

// endsOpen tells whether a statement's line cannot be its last one.
func endsOpen(s string) bool {
	if s == "" {
		return false
	}
	c := s[len(s)-1]
	switch c {
	case '+', '-', '*', '/', '^', '<', '>', '=', ',':
		return true
	case 'd', 'r', 't', 'f', 'h', 'e': // and or not at if of with where over
	default:
		if c < utf8.RuneSelf {
			return false
		}
		r, _ := utf8.DecodeLastRuneInString(s)
		return strings.ContainsRune("×·⋅∙÷−≤≥≠√", r)
	}
	i := len(s) - 1
	for i > 0 && byteClass[s[i-1]]&letterByte != 0 {
		i--
	}
	if i > 0 && (byteClass[s[i-1]]&nameByte != 0 || s[i-1] >= utf8.RuneSelf || s[i-1] == '.') {
		return false
	}
	switch s[i:] {
	case "and", "or", "not", "at", "if", "of", "with", "where", "over":
		return true
	}
	return false
}

// stopsBefore tells whether a line cannot go on with the statement above it,
// whose last line is above. bracket tells that a bracket is open.
func (p *parser) stopsBefore(line Line, bracket bool, above string) bool {
	l := trimmed(p.s, line.Start, line.End)
	text := p.s[l.Start:l.End]
	switch {
	case text == "", strings.HasPrefix(text, "//"):
		return true
	case text[0] == '=':
		return !strings.HasPrefix(text, "==")
	}
	end := nameEnd(text, 0, len(text))
	if end == 0 {
		return false
	}
	switch text[:end] {
	case "check":
		return true
	case "needs", "gives":
		return p.kind == HelperBlock
	}
	begins, plain := beginsDefinition(text, end, p.kind == HelperBlock && bracket)
	if begins && plain && bracket && (strings.HasSuffix(above, ",") || strings.HasSuffix(above, "(")) {
		return false // an argument by name
	}
	return begins
}

// beginsDefinition tells whether a line that starts with a name of the given
// length begins a definition: `name =`, `name [unit] =`, `name(…) [unit] =`. plain
// tells that it is `name =`. In a helper `name [unit]` alone does too.
func beginsDefinition(s string, end int, parameter bool) (begins, plain bool) {
	i := blanksEnd(s, end)
	plain = true
	if i < len(s) && s[i] == '(' {
		n := strings.IndexByte(s[i:], ')')
		if n < 0 || strings.IndexByte(s[i+1:i+n], '(') >= 0 {
			return false, false
		}
		i, plain = blanksEnd(s, i+n+1), false
	}
	if i < len(s) && s[i] == '[' {
		n := strings.IndexByte(s[i:], ']')
		if n < 0 {
			return false, false
		}
		i, plain = blanksEnd(s, i+n+1), false
		if parameter && (i >= len(s) || s[i] == '#') {
			return true, false
		}
	}
	return i < len(s) && s[i] == '=' && !strings.HasPrefix(s[i:], "=="), plain
}

func blanksEnd(s string, i int) int {
	for i < len(s) && byteClass[s[i]]&blankByte != 0 {
		i++
	}
	return i
}

// isBlank and isRemark tell what a line that is no statement is.
func (p *parser) isBlank(line Line) bool {
	l := trimmed(p.s, line.Start, line.End)
	return l.Start == l.End
}

func (p *parser) isRemark(line Line) bool {
	l := trimmed(p.s, line.Start, line.End)
	return strings.HasPrefix(p.s[l.Start:l.End], "//")
}
