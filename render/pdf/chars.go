package pdf

import (
	"strings"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"

	"gusset/render/fonts"
)

// span is a stretch of text that one face can set whole. A span with a code
// is a single character that no face has; it is drawn as a frame around its
// code point.
type span struct {
	face *fonts.Face
	text string
	code rune
}

// settable returns a text with everything taken out that the library below
// cannot take: it panics on truncated UTF-8 and above U+FFFF. Composed forms
// are used where Unicode has them, control characters become blanks, and
// characters that only steer a renderer (soft hyphens, joiners, direction and
// variation marks) go.
func settable(s string) string {
	if plainASCII(s) {
		return s
	}
	s = strings.ToValidUTF8(s, "\uFFFD")
	if !norm.NFC.IsNormalString(s) {
		s = norm.NFC.String(s)
	}
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\u2028' || r == '\u2029' || r < ' ' || r >= 0x7F && r < 0xA0:
			return ' '
		case steers(r):
			return -1
		}
		return r
	}, s)
}

func plainASCII(s string) bool {
	for i := range len(s) {
		if s[i] < ' ' || s[i] > '~' {
			return false
		}
	}
	return true
}

// steers reports whether a character has no shape of its own. A zero-width
// space is kept: it says where a line may break.
func steers(r rune) bool {
	switch {
	case r == 0xAD, r == 0x34F, r == 0x61C, r == 0xFEFF,
		r >= 0x200C && r <= 0x200F, r >= 0x202A && r <= 0x202E,
		r >= 0x2060 && r <= 0x2064, r >= 0x2066 && r <= 0x206F,
		r >= 0xFE00 && r <= 0xFE0F,
		r >= 0xE0000 && r <= 0xE0FFF:
		return true
	}
	return false
}

// spans cuts a text into what each face can set: its own face first, a letter
// with marks of which it lacks the whole by its parts, then serif, sans, maths
// and mono. A character that none has is spelt by its
// plain equivalent where Unicode gives one (𝑥 as x, ﬁ as fi, Ⅳ as IV), else
// it stands as its code.
func spans(face *fonts.Face, s string) []span {
	s = strings.ReplaceAll(settable(s), "\u200B", "")
	if hasAll(face, s) {
		if s == "" {
			return nil
		}
		return []span{{face: face, text: s}}
	}
	var out []span
	for _, r := range s {
		out = appendSpan(out, face, r)
	}
	return out
}

func appendSpan(out []span, face *fonts.Face, r rune) []span {
	if own := face.Spelling(r); own != "" {
		return joinSpan(out, span{face: face, text: own})
	}
	if f := faceFor(face, r); f != nil {
		return joinSpan(out, span{face: f, text: string(r)})
	}
	equal := plainEquivalent(face, r)
	if equal == "" {
		return append(out, span{face: fonts.Sans, code: r})
	}
	for _, e := range equal {
		out = joinSpan(out, span{face: faceFor(face, e), text: string(e)})
	}
	return out
}

func joinSpan(out []span, s span) []span {
	if n := len(out); n > 0 && out[n-1].face == s.face && out[n-1].code == 0 {
		out[n-1].text += s.text
		return out
	}
	return append(out, s)
}

func hasAll(face *fonts.Face, s string) bool {
	for _, r := range s {
		if !face.Has(r) {
			return false
		}
	}
	return true
}

// faceFor returns the first face that has a character, nil where none has.
func faceFor(face *fonts.Face, r rune) *fonts.Face {
	if face.Has(r) {
		return face
	}
	serif, sans := fonts.Serif, fonts.Sans
	if face.Weight == 600 {
		serif, sans = fonts.SerifSemiBold, fonts.SansSemiBold
	}
	first, second := serif, sans
	if face == fonts.Mono || face == fonts.Sans || face == fonts.SansSemiBold {
		first, second = sans, serif
	}
	for _, f := range []*fonts.Face{first, second, fonts.Math, fonts.Mono} {
		if f.Has(r) {
			return f
		}
	}
	return nil
}

// plainEquivalent returns the compatibility decomposition of a character if
// the faces have all of it, else "".
func plainEquivalent(face *fonts.Face, r rune) string {
	var enc [utf8.UTFMax]byte
	n := utf8.EncodeRune(enc[:], r)
	d := norm.NFKC.Properties(enc[:n]).Decomposition()
	if len(d) == 0 {
		return ""
	}
	equal := string(norm.NFC.Bytes(norm.NFKD.Bytes(enc[:n])))
	for _, e := range equal {
		if faceFor(face, e) == nil {
			return ""
		}
	}
	return equal
}

// bookmark returns a text as the outline and the document's properties can
// hold it: there no frame can be drawn, so a character beyond U+FFFF without
// an equivalent is written as its code.
func bookmark(s string) string {
	var b strings.Builder
	for _, r := range settable(s) {
		switch {
		case r == '\u200B':
		case r <= 0xFFFF:
			b.WriteRune(r)
		default:
			if equal := plainEquivalent(fonts.Serif, r); equal != "" {
				b.WriteString(equal)
			} else {
				b.WriteString(codeText(r))
			}
		}
	}
	return b.String()
}

// codeText is how a character is named that cannot be set: U+1F600.
func codeText(r rune) string {
	const hex = "0123456789ABCDEF"
	digits := ""
	for v := r; v > 0 || len(digits) < 4; v >>= 4 {
		digits = string(hex[v&15]) + digits
	}
	return "U+" + digits
}
