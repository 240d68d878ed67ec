package maths

import "unicode/utf8"

// AppendText appends character data or an attribute's value as a web page has
// it, inside formulas and outside. What no page may hold becomes a replacement
// character; marks that turn the direction of writing are left out, since they
// could make a line read as something else.
func AppendText(dst []byte, s string) []byte {
	from := 0
	for i := 0; i < len(s); {
		c := s[i]
		if ordinaryText[c] {
			i++
			continue
		}
		size, with := 1, "\uFFFD"
		switch c {
		case '&':
			with = "&amp;"
		case '<':
			with = "&lt;"
		case '>':
			with = "&gt;"
		case '"':
			with = "&quot;"
		default:
			if c < utf8.RuneSelf {
				break
			}
			var r rune
			r, size = utf8.DecodeRuneInString(s[i:])
			switch {
			case r == utf8.RuneError && size == 1, noncharacter(r):
			case turns(r):
				with = ""
			default:
				i += size
				continue
			}
		}
		dst = append(dst, s[from:i]...)
		dst = append(dst, with...)
		i += size
		from = i
	}
	return append(dst, s[from:]...)
}

// ordinaryText are the characters that stand in a page as they are.
var ordinaryText = func() (set [256]bool) {
	for c := ' '; c < 0x7f; c++ {
		set[c] = c != '&' && c != '<' && c != '>' && c != '"'
	}
	set['\n'], set['\t'] = true, true
	return set
}()

// noncharacter tells whether a character may not stand in a page.
func noncharacter(r rune) bool {
	return r >= 0x80 && r < 0xA0 || r >= 0xFDD0 && r <= 0xFDEF || r&0xFFFE == 0xFFFE
}

// turns tells whether a character overrides the direction of what follows it.
func turns(r rune) bool {
	return r >= 0x202A && r <= 0x202E || r >= 0x2066 && r <= 0x2069
}
