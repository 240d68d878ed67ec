package pdf

import (
	"bytes"
	"fmt"
	"strings"
	"sync"
	"testing"
	"testing/fstest"
	"time"

	"github.com/google/go-cmp/cmp"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/fonts"
)

// The same page gives the same bytes, also when many are written at once.
func TestSameBytes(t *testing.T) {
	p := pageOf(t, fixture(t, "lug.md"), nil)
	first, err := Write(p, time.Time{})
	if err != nil {
		t.Fatal(err)
	}
	var wait sync.WaitGroup
	for range 4 {
		wait.Add(1)
		go func() {
			defer wait.Done()
			again, err := Write(p, time.Now())
			if err != nil || !bytes.Equal(first, again) {
				t.Errorf("other bytes (%v)", err)
			}
		}()
	}
	wait.Wait()
	fresh, err := Write(pageOf(t, fixture(t, "lug.md"), nil), time.Time{})
	if err != nil || !bytes.Equal(first, fresh) {
		t.Errorf("compiled anew: other bytes (%v)", err)
	}
}

// Without a date of its own a calc takes the one given, and a fixed one
// without that.
func TestDates(t *testing.T) {
	undated := pageOf(t, strings.Replace(front, "date: 2026-03-02\n", "", 1), nil)
	dated := pageOf(t, front, nil)
	given := time.Date(2025, 12, 24, 18, 0, 0, 0, time.UTC)
	tests := []struct {
		name string
		page *render.Page
		date time.Time
		want string
	}{
		{"the calc's", dated, given, "/CreationDate (D:20260302000000)"},
		{"the one given", undated, given, "/CreationDate (D:20251224180000)"},
		{"in its own zone", undated, given.In(time.FixedZone("", 3600)), "/CreationDate (D:20251224180000)"},
		{"the fixed one", undated, time.Time{}, "/CreationDate (D:20000101000000)"},
	}
	for _, tt := range tests {
		got, err := Write(tt.page, tt.date)
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Contains(got, []byte(tt.want)) {
			t.Errorf("%s: no %s", tt.name, tt.want)
		}
	}
}

// The library writes into the bytes of a face when it cuts out a glyph that
// has no width of its own in the file. The bytes are everyone's, so no
// character may have such a glyph.
func TestNoCharacterHasASharedWidth(t *testing.T) {
	for _, f := range fonts.Faces() {
		hhea := f.Table("hhea")
		widths := int(hhea[34])<<8 | int(hhea[35])
		for r := rune(0); r <= 0xFFFF; r++ {
			if int(f.Glyph(r)) >= widths {
				t.Errorf("%s: %U", f.Name, r)
			}
		}
	}
}

func TestLetter(t *testing.T) {
	l := newDocument(pageOf(t, strings.Replace(front, "rev: B", "paper: Letter", 1), nil)).layout()
	if l.paper.width != 612 || l.paper.height != 792 {
		t.Errorf("%v", l.paper)
	}
	inFrame(t, l)
	if pdf := written(t, l); !bytes.Contains(pdf, []byte("/MediaBox [0 0 612.00 792.00]")) {
		t.Error("the sheet is no Letter")
	}
}

func TestUnsupported(t *testing.T) {
	p := pageOf(t, front+"\nalpha 😀 beta 😀 𝑥\n\nمرحبا بالعالم, مرحبا\n\n```calc\n// never printed: 🚧\nP = 3 kN # pull 梁 [s]\n```\n", nil)
	var got []string
	for _, d := range Unsupported(p) {
		line, column := d.Source.Position(d.Span.Start)
		got = append(got, d.ID+" "+d.Severity.String()+" "+d.Message[:strings.Index(d.Message, ";")])
		if line == 0 || column == 0 || d.Source.Slice(d.Span) == "" {
			t.Errorf("%v has no place", d)
		}
	}
	want := "unsupported-character warning no face has the character U+1F600|" +
		"unsupported-character warning no face has the characters U+0645, U+0631, U+062D, U+0628 and 3 more|unsupported-character warning no face has the character U+6881"
	if strings.Join(got, "|") != want {
		t.Errorf("got %q", got)
	}
}

// Characters that other files bring in are told at the place that takes them,
// those of a helper's lines in the helper's file.
func TestUnsupportedElsewhere(t *testing.T) {
	const text = `---
calc: C-1
from: {loads: loads.md}
helpers: {shop: shop.md}
---
` + "```calc\nP = loads.P\ntau = shop.spread(P, 20 mm^2)\n```\n```schedule s from s.csv\n```\n"
	p := pageOf(t, text, map[string]string{
		"register.yaml": "firm: 公 works\n",
		"loads.md":      "---\ncalc: L-1\ntitle: 梁 loads\n---\n\n荷\n\n```calc\nP = 3 kN # never printed there: 荷\n```\n",
		"shop.md":       "# 店, never printed\n\n```helper spread # 均 [源]\nV [force]\nA [area]\nt [stress] = V/A # 力\ngives t\n```\n",
		"s.csv":         "mark,x [mm]\n甲,1\n",
	})
	var got []string
	for _, d := range Unsupported(p) {
		line, column := d.Source.Position(d.Span.Start)
		got = append(got, fmt.Sprintf("%s:%d:%d %s", d.Source.Name, line, column, strings.Fields(d.Message)[5]))
	}
	want := []string{"calc.md:7:1 U+6881;", "shop.md:3:20 U+5747;", "shop.md:3:23 U+6E90;", "shop.md:6:20 U+529B;", "calc.md:10:1 U+7532;", "calc.md:1:1 U+516C;"}
	if diff := cmp.Diff(want, got); diff != "" {
		t.Error(diff)
	}
}

// FuzzWrite writes whatever can be compiled: it never panics, and nothing is
// printed outside of the sheet.
func FuzzWrite(f *testing.F) {
	for _, c := range constructs {
		f.Add(c.markdown)
	}
	for _, name := range []string{"lug.md"} {
		_, body, _ := strings.Cut(strings.TrimPrefix(fixture(f, name), "---\n"), "\n---\n")
		f.Add(body)
	}
	for _, s := range []string{
		"\u202E\u0000\uFFFF\U0010FFFF\xE2\x82", "> Hold: \U0001F1E9\U0001F1EA", "| 😀 | ﷺ |\n|--|--|\n| 𝒳 | e\u0301\u0302\u0303 |",
		"```calc\nτ_d' [MPa] = 3 kN/(2 mm)^2 # 😀 [梁]\ncheck τ_d' < 1 MPa\n```", "    \t\t\u200B\t", strings.Repeat("> - ", 60) + "deep",
	} {
		f.Add(s)
	}
	dot := dotPNG(f)
	f.Fuzz(func(t *testing.T, body string) {
		if len(body) > 4<<10 {
			return
		}
		root := fstest.MapFS{"calc.md": {Data: []byte(front + "\n" + body)}, "dot.png": {Data: []byte(dot)}}
		s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
		if s.Failed() {
			return
		}
		p := render.NewPage(s)
		Unsupported(p)
		l := newDocument(p).layout()
		inFrame(t, l)
		if _, err := l.write(fixedDate); err != nil {
			t.Fatal(err)
		}
	})
}
