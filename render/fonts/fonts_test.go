package fonts

import (
	"bytes"
	"strings"
	"testing"

	"golang.org/x/image/font"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
)

// Another reader of TrueType agrees on every character up to U+FFFF: its glyph
// and its width.
func TestGlyphsAgainstSfnt(t *testing.T) {
	for _, f := range Faces() {
		ref, err := sfnt.Parse(f.TTF)
		if err != nil {
			t.Fatalf("%s: %v", f.file, err)
		}
		if got := ref.UnitsPerEm(); got != 1000 {
			t.Errorf("%s: %d units to the em, want 1000", f.file, got)
		}
		var buf sfnt.Buffer
		count := 0
		for r := rune(1); r < 0xFFFF; r++ {
			want, err := ref.GlyphIndex(&buf, r)
			if err != nil {
				t.Fatalf("%s: %U: %v", f.file, r, err)
			}
			if got := f.Glyph(r); got != uint16(want) || f.Has(r) != (want != 0) {
				t.Fatalf("%s: %U is glyph %d, want %d", f.file, r, got, want)
			}
			if want == 0 {
				continue
			}
			count++
			width, err := ref.GlyphAdvance(&buf, want, fixed.I(1000), font.HintingNone)
			if err != nil {
				t.Fatalf("%s: %U: %v", f.file, r, err)
			}
			if got := f.Advance(r); got != width.Round() {
				t.Fatalf("%s: %U is %d wide, want %v", f.file, r, got, width)
			}
			box, _, err := ref.GlyphBounds(&buf, want, fixed.I(1000), font.HintingNone)
			if err != nil {
				t.Fatalf("%s: %U: %v", f.file, r, err)
			}
			x0, y0, x1, y1 := f.Bounds(f.Glyph(r))
			if x0 != box.Min.X.Round() || y0 != -box.Max.Y.Round() || x1 != box.Max.X.Round() || y1 != -box.Min.Y.Round() {
				t.Fatalf("%s: %U has the box %d %d %d %d, want %v", f.file, r, x0, y0, x1, y1, box)
			}
		}
		if count < 300 {
			t.Errorf("%s: only %d characters", f.file, count)
		}
	}
}

// The files are the published ones: a TrueType file whose checksum adjustment
// is right sums up to 0xB1B0AFBA (OpenType specification, head). The sans is
// published with an adjustment that is not, so its tables must do.
func TestFilesAreWhole(t *testing.T) {
	for _, f := range Faces() {
		for i := range u16(f.TTF[4:]) {
			entry := f.TTF[12+16*i:]
			tag := string(entry[:4])
			data := bytes.Clone(f.Table(tag))
			if tag == "head" {
				clear(data[8:12])
			}
			if got, want := checksum(data), uint32(u32(entry[4:])); got != want {
				t.Errorf("%s: table %s sums to %#x, want %#x", f.file, tag, got, want)
			}
		}
		if got := checksum(f.TTF); got != 0xB1B0AFBA && f.Short != "Plex Sans" {
			t.Errorf("%s: the file sums to %#x", f.file, got)
		}
	}
}

func TestHas(t *testing.T) {
	for _, c := range []struct {
		face  *Face
		chars string
		want  bool
	}{
		{SerifItalic, "αβγδεζηθικλμνξοπρστυφχψωΓΔΘΛΞΠΣΦΨΩ", true},
		{Serif, "αΩ²³⁴·×−≤≥≠←°µ\u202f\u2009", true},
		{Sans, "αΩ²³⁴·×−≤≥≠°µ\u202f", true},
		{Mono, "π", true},
		{Mono, "ατ", false},
		{Math, "+−=≤≥≠·×√()[]{}|", true},
		{Serif, "漢\U0001F600\U0001D70F", false},
		{Math, "\U0001D70F", false}, // it has it, but beyond U+FFFF
	} {
		for _, r := range c.chars {
			if got := c.face.Has(r); got != c.want {
				t.Errorf("%s: Has(%U) is %v", c.face.file, r, got)
			}
		}
	}
	if Serif.Has(-1) || Serif.Has(0x10FFFF) {
		t.Error("a character outside of all faces is found")
	}
}

// The values were read from the published face with a font inspector.
func TestMathTable(t *testing.T) {
	m := MathMetrics()
	for _, c := range []struct {
		name      string
		got, want int
	}{
		{"axis height", m.AxisHeight, 262},
		{"fraction rule", m.FractionRuleThickness, 66},
		{"radical rule", m.RadicalRuleThickness, 66},
		{"script size", m.ScriptPercent, 65},
		{"script of script size", m.ScriptScriptPercent, 50},
		{"degree's raise", m.RadicalDegreeRaisePercent, 60},
	} {
		if c.got != c.want {
			t.Errorf("%s: got %d, want %d", c.name, c.got, c.want)
		}
	}
	for _, r := range "()[]{}|√" {
		g := m.Growth(Math.Glyph(r))
		if len(g.Variants) != 13 || len(g.Parts) == 0 {
			t.Errorf("%c: %d variants and %d parts, want 13 and some", r, len(g.Variants), len(g.Parts))
		}
		for i, v := range g.Variants {
			_, low, _, high := Math.Bounds(v.Glyph)
			if d := high - low - v.Height; d < -1 || d > 1 {
				t.Errorf("%c: variant %d is %d tall, its outline %d", r, i, v.Height, high-low)
			}
		}
	}
	if g := m.Growth(Math.Glyph('a')); g.Variants != nil || g.Parts != nil {
		t.Error("a letter grows")
	}
}

func TestCSSTakesTheNeededParts(t *testing.T) {
	for _, c := range []struct {
		text string
		face *Face
		want int
	}{
		{"", Serif, 0},
		{"P", Serif, 1},
		{"P = τ", Serif, 2},
		{"P ≤ τ", Serif, 3},
		{"Ж", Serif, 1},
		{"漢\U0001F600\xff", Math, 0},
		{"=", Math, 1},
		{"P", Math, 0},
	} {
		var page Runes
		page.Add([]byte(c.text))
		got := len(Rules(&page, c.face))
		if got != c.want {
			t.Errorf("%q: %s in %d parts, want %d", c.text, c.face.file, got, c.want)
		}
	}
}

func TestRunes(t *testing.T) {
	var s Runes
	s.Add([]byte("aτ\U0001F600€\xe2\x82"))
	for r, want := range map[rune]bool{'a': true, 'τ': true, '€': true, 'b': false, 0x1F600: false, 0xFFFD: true, -1: false} {
		if s.Has(r) != want {
			t.Errorf("Has(%U) is %v", r, !want)
		}
	}
}

// A character that a face has but none of its parts is set in another face in
// the browser. The packages leave out accents that stand alone, and in the sans
// some hyphens.
func TestPartsCoverTheFaces(t *testing.T) {
	for _, f := range Faces() {
		if f == Math {
			continue
		}
		var claimed Runes
		for _, p := range f.web() {
			for _, s := range p.spans {
				for r := s.from; r <= s.to; r++ {
					claimed.words[r>>6] |= 1 << (r & 63)
				}
			}
		}
		for r := rune(0x20); r < 0xE000; r++ {
			accent := r >= 0x2B0 && r < 0x370 || r == 0x384 || r == 0x385
			if f.Has(r) && !claimed.Has(r) && !accent && !(f.Short == "Plex Sans" && strings.ContainsRune("‐‑‒∙∶", r)) {
				t.Errorf("%s: %U %c is in no part", f.file, r, r)
			}
		}
	}
	for _, r := range mathSigns {
		if !Math.Has(r) {
			t.Errorf("the math face has no %U", r)
		}
	}
}

// The part of the math face is a font that reads back with the same glyphs.
func TestMathPartReadsBack(t *testing.T) {
	tables := Math.subset(mathSigns)
	data := woff(tables)
	if got := u32(data[8:]); got != len(data) {
		t.Errorf("the file says %d bytes and has %d", got, len(data))
	}
	g := Math.glyphs()
	for i, tab := range tables {
		entry := data[44+20*i:]
		if string(entry[:4]) != tab.tag || u32(entry[12:]) != len(tab.data) {
			t.Errorf("table %d is %q with %d bytes, want %q with %d", i, entry[:4], u32(entry[12:]), tab.tag, len(tab.data))
		}
	}
	part := readGlyphs(unwrap(tables))
	for _, r := range mathSigns {
		glyph := g.index(r)
		if got := part.advances[glyph]; got != g.advances[glyph] {
			t.Errorf("%U is %d wide, want %d", r, got, g.advances[glyph])
		}
		got := part.glyf[part.loca[glyph]:part.loca[glyph+1]]
		if want := g.glyf[g.loca[glyph]:g.loca[glyph+1]]; !bytes.Equal(got, want) {
			t.Errorf("%U has another outline", r)
		}
	}
	if a := g.index('A'); part.loca[a] != part.loca[a+1] {
		t.Error("a letter is in the part")
	}
}

// unwrap joins tables to a TrueType file.
func unwrap(tables []fontTable) []byte {
	b := make([]byte, 12+16*len(tables))
	b[5] = byte(len(tables))
	for i, t := range tables {
		copy(b[12+16*i:], t.tag)
		for k, v := range []int{len(b), len(t.data)} {
			for j := range 4 {
				b[12+16*i+8+4*k+j] = byte(v >> (24 - 8*j))
			}
		}
		b = append(b, t.data...)
	}
	return b
}

func BenchmarkMathPart(b *testing.B) {
	size := 0
	for b.Loop() {
		size = len(Math.mathPart().rule)
	}
	b.ReportMetric(float64(size), "bytes")
}

func BenchmarkReadGlyphs(b *testing.B) {
	for b.Loop() {
		readGlyphs(SerifItalic.TTF)
	}
}
