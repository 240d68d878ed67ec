package syntax

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// maxName bounds a name, its dots included, in characters.
const maxName = 200

// Canonical returns a name's English spelling: `tau_d` for `τ_d`. Every Greek
// letter becomes its English name, so that both spellings are one name.
func Canonical(name string) string {
	if isASCII(name) {
		return name
	}
	var b strings.Builder
	for _, r := range name {
		if english, ok := greekByRune[r]; ok {
			b.WriteString(english)
		} else {
			b.WriteRune(r)
		}
	}
	return b.String()
}

func isASCII(s string) bool {
	for i := 0; i < len(s); i++ {
		if s[i] >= utf8.RuneSelf {
			return false
		}
	}
	return true
}

// NamePart is the head or one part of the subscript of a name as it is set on
// a page. Greek tells that it starts with a Greek letter; Primes counts the
// marks behind it.
type NamePart struct {
	Text   string
	Greek  bool
	Primes int
}

// DisplayParts splits a name without dots into its head and the parts of its
// subscript. A part that is exactly a Greek letter's English name, figures
// behind it aside, becomes the letter: `sigma1` is σ1, `tau_max` is τ and max.
func DisplayParts(name string) []NamePart {
	parts := make([]NamePart, 0, 1+strings.Count(name, "_"))
	for part := range strings.SplitSeq(name, "_") {
		bare := strings.ReplaceAll(part, "'", "")
		p := NamePart{Text: bare, Primes: len(part) - len(bare)}
		stem := strings.TrimRight(bare, "0123456789")
		if letter, ok := greekByName[Canonical(stem)]; ok {
			p.Text, p.Greek = string(letter)+bare[len(stem):], true
		} else if r, _ := utf8.DecodeRuneInString(bare); greekByRune[r] != "" {
			p.Greek = true
		}
		if p.Text != "" || p.Primes > 0 {
			parts = append(parts, p)
		}
	}
	return parts
}

// reserved are the words that may not be names, by their tokens.
func reserved(word string) token {
	if len(word) < 2 || len(word) > 9 {
		return tName
	}
	switch word {
	case "if":
		return tIf
	case "otherwise":
		return tOtherwise
	case "else":
		return tElse
	case "and":
		return tAnd
	case "or":
		return tOr
	case "not":
		return tNot
	case "at":
		return tAt
	case "over":
		return tOver
	case "first":
		return tFirst
	case "of":
		return tOf
	case "with":
		return tWith
	case "where":
		return tWhere
	case "check":
		return tCheck
	case "needs":
		return tNeeds
	case "warn":
		return tWarn
	case "gives":
		return tGives
	}
	return tName
}

// IsReserved tells whether a word of the notation may not be a name.
func IsReserved(word string) bool { return reserved(word) != tName }

// isNameLetter tells whether a character beyond ASCII may stand in a name:
// a Latin or Greek letter. Others have no face on the page, and the Cyrillic
// ones look like Latin ones, which a checker could not tell apart.
func isNameLetter(r rune) bool {
	if r == '\u00b5' || r == '\u2206' || r == 'ℓ' {
		return true
	}
	return unicode.IsLetter(r) && !unicode.Is(unicode.Lm, r) && (unicode.Is(unicode.Latin, r) || unicode.Is(unicode.Greek, r)) && r != 'ª' && r != 'º'
}

// The classes of the bytes of ASCII.
const (
	letterByte = 1 << iota
	digitByte
	nameByte  // goes on with a name
	blankByte // within a line
	lineByte  // stops the scan for a statement's extent
)

var byteClass = classifyBytes()

func classifyBytes() (class [256]uint8) {
	for c := 'a'; c <= 'z'; c++ {
		class[c] = letterByte | nameByte
		class[c-'a'+'A'] = letterByte | nameByte
	}
	for c := '0'; c <= '9'; c++ {
		class[c] = digitByte | nameByte
	}
	class['_'], class['\''] = nameByte, nameByte
	class[' '], class['\t'], class['\r'] = blankByte, blankByte, blankByte
	for _, c := range `#"()[]` {
		class[c] = lineByte
	}
	return class
}

func isDigit(c byte) bool { return byteClass[c]&digitByte != 0 }

// nameEnd returns the end of the name that starts at i in s[:end], without
// dots, or i where none starts there.
func nameEnd(s string, i, end int) int {
	start := i
	for i < end {
		c := s[i]
		if c < utf8.RuneSelf {
			if byteClass[c]&nameByte == 0 || i == start && byteClass[c]&letterByte == 0 {
				return i
			}
			i++
			continue
		}
		r, size := utf8.DecodeRuneInString(s[i:end])
		if !isNameLetter(r) {
			return i
		}
		i += size
	}
	return i
}

// dottedEnd is nameEnd with dots between names.
func dottedEnd(s string, i, end int) int {
	i = nameEnd(s, i, end)
	for i+1 < end && s[i] == '.' {
		next := nameEnd(s, i+1, end)
		if next == i+1 {
			break
		}
		i = next
	}
	return i
}
