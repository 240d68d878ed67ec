package fonts

import (
	"encoding/base64"
	"strconv"
	"strings"
	"unicode/utf8"
)

// Runes is a set of characters up to U+FFFF, such as those of one page. The
// zero value is empty.
type Runes struct{ words [1024]uint64 }

// Add adds the characters of a text.
func (s *Runes) Add(text []byte) {
	for i := 0; i < len(text); {
		r, size := rune(text[i]), 1
		if r >= utf8.RuneSelf {
			r, size = utf8.DecodeRune(text[i:])
		}
		if r <= 0xFFFF {
			s.words[r>>6] |= 1 << (r & 63)
		}
		i += size
	}
}

// Has reports whether a character is in the set.
func (s *Runes) Has(r rune) bool {
	return r >= 0 && r <= 0xFFFF && s.words[r>>6]&(1<<(r&63)) != 0
}

// meets reports whether the set has a character of any of the spans.
func (s *Runes) meets(spans []span) bool {
	for _, p := range spans {
		for r := p.from; r <= p.to; r++ {
			if s.Has(r) {
				return true
			}
		}
	}
	return false
}

type span struct{ from, to rune }

// A part is one file of a face for the web: its characters and their glyphs.
type part struct {
	ranges string // as a style sheet has it
	spans  []span
	rule   string // the whole style rule, data included
}

// Rules returns the style rules for the faces of a page, each with the parts
// that the characters of the page need, their data inside. The families are
// called by their short names.
func Rules(page *Runes, faces ...*Face) []string {
	var rules []string
	for _, f := range faces {
		for _, p := range f.web() {
			if page.meets(p.spans) {
				rules = append(rules, p.rule)
			}
		}
	}
	return rules
}

// webParts returns the parts of a face: as the face's package splits it, or for
// the math face the one part of mathPart.
func (f *Face) webParts() []part {
	if f.Table("MATH") != nil {
		return []part{f.mathPart()}
	}
	var parts []part
	sheet := string(read(f.file + ".css"))
	for rule := range strings.SplitSeq(sheet, "/* Subset: ") {
		name, rest, found := strings.Cut(rule, " */")
		_, ranges, ok := strings.Cut(rest, "unicode-range: ")
		if !found || !ok {
			continue
		}
		ranges, _, _ = strings.Cut(ranges, "\n")
		parts = append(parts, f.part(ranges, "woff2", read(f.file+"-"+name+".woff2")))
	}
	return parts
}

func (f *Face) part(ranges, format string, data []byte) part {
	ranges = strings.ReplaceAll(ranges, ", ", ",")
	style := "normal"
	if f.Italic {
		style = "italic"
	}
	return part{
		ranges: ranges,
		spans:  readRanges(ranges),
		rule: `@font-face{font-family:"` + f.Short + `";font-style:` + style +
			`;font-weight:` + strconv.Itoa(f.Weight) +
			`;src:url(data:font/` + format + `;base64,` + base64.StdEncoding.EncodeToString(data) +
			`) format("` + format + `");unicode-range:` + ranges + "}\n",
	}
}

// readRanges reads U+0020-007E,U+00A0.
func readRanges(ranges string) []span {
	var spans []span
	for r := range strings.SplitSeq(ranges, ",") {
		from, to, ok := strings.Cut(strings.TrimPrefix(r, "U+"), "-")
		if !ok {
			to = from
		}
		a, _ := strconv.ParseUint(from, 16, 32)
		b, _ := strconv.ParseUint(to, 16, 32)
		spans = append(spans, span{rune(a), rune(b)})
	}
	return spans
}
