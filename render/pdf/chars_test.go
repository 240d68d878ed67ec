package pdf

import (
	"strings"
	"testing"
	"unicode/utf8"

	"gusset/render/fonts"
)

func TestSpans(t *testing.T) {
	tests := []struct {
		name string
		face *fonts.Face
		text string
		want string // texts by face, codes in brackets
	}{
		{"plain", fonts.Serif, "shear", "Serif:shear"},
		{"Greek in serif", fonts.Serif, "τ ≤ σ", "Serif:τ ≤ σ"},
		{"Greek in code goes to the sans", fonts.Mono, "a=τ", "Mono:a= Sans:τ"},
		{"mathematical letters are letters", fonts.Serif, "𝑥𝐀", "Serif:xA"},
		{"ligatures stay where the face has them", fonts.Serif, "ﬁ", "Serif:ﬁ"},
		{"a roman numeral", fonts.Serif, "Ⅷ", "Serif:VIII"},
		{"full width", fonts.Serif, "ＡＢ", "Serif:AB"},
		{"composed", fonts.Serif, "e\u0301", "Serif:é"},
		{"an emoji is a code", fonts.Serif, "ok 😀!", "Serif:ok  [U+1F600] Serif:!"},
		{"variation and direction marks go", fonts.Serif, "a\uFE0F\u202Eb", "Serif:ab"},
		{"controls are blanks", fonts.Serif, "a\x00b\tc\u0085d", "Serif:a b c d"},
		{"soft hyphens and joiners go", fonts.Serif, "a\u00ADb\u200Dc", "Serif:abc"},
		{"not UTF-8", fonts.Serif, "a\xE2\x82", "Serif:a�"},
		{"beyond all planes in use", fonts.Serif, "\U0010FFFD", "[U+10FFFD]"},
		{"han", fonts.Sans, "梁", "[U+6881]"},
		{"nothing", fonts.Serif, "", ""},
	}
	for _, tt := range tests {
		var got []string
		for _, s := range spans(tt.face, tt.text) {
			if s.code != 0 {
				got = append(got, "["+codeText(s.code)+"]")
				continue
			}
			got = append(got, strings.TrimPrefix(s.face.Name, "IBM Plex ")+":"+s.text)
		}
		if strings.Join(got, " ") != tt.want {
			t.Errorf("%s: got %q, want %q", tt.name, strings.Join(got, " "), tt.want)
		}
	}
}

func TestBookmarkText(t *testing.T) {
	tests := []struct{ in, want string }{
		{"τ in shear", "τ in shear"},
		{"𝑥 and 😀", "x and U+1F600"},
		{"cut \xF0\x9F", "cut �"},
	}
	for _, tt := range tests {
		if got := bookmark(tt.in); got != tt.want {
			t.Errorf("bookmark(%q) = %q, want %q", tt.in, got, tt.want)
		}
	}
}

// Whatever is typed, what reaches the library is UTF-8 below U+10000 that the
// face has.
func FuzzSpans(f *testing.F) {
	for _, s := range []string{"τ ≤ 𝑥 😀", "a\xE2\x82", "\x00\xFF", "e\u0301\u0301", "\u202E\uFFFF", "ﷺ", "\U000E0041"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		for _, face := range fonts.Faces() {
			for _, sp := range spans(face, s) {
				if sp.code != 0 {
					continue
				}
				if !utf8.ValidString(sp.text) || sp.text == "" {
					t.Fatalf("%q is not to be drawn", sp.text)
				}
				for _, r := range sp.text {
					if r > 0xFFFF || !sp.face.Has(r) {
						t.Fatalf("%s has no %U", sp.face.Name, r)
					}
				}
			}
		}
		if b := bookmark(s); !utf8.ValidString(b) || strings.ContainsFunc(b, func(r rune) bool { return r > 0xFFFF }) {
			t.Fatalf("%q is not a bookmark", b)
		}
	})
}
