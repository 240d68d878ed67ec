package html_test

import (
	"bytes"
	"os"
	"strings"
	"testing"
	"testing/fstest"
	"unicode/utf8"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/html"
)

// FuzzPage compiles any file and writes it. Whatever the file says, the page is
// text that a browser can read, holds no script, and is the same each time.
func FuzzPage(f *testing.F) {
	for _, c := range constructs {
		f.Add([]byte("---\ncalc: T-1\n---\n\n```calc\nP = 48 kN\n```\n\n" + c.markdown + "\n"))
	}
	for _, file := range []string{"testdata/lug.md", "testdata/rows.md", "testdata/parts.md"} {
		text, err := os.ReadFile(file)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text)
	}
	loads, err := os.ReadFile("testdata/loads.md")
	if err != nil {
		f.Fatal(err)
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		root := fstest.MapFS{"t.md": {Data: text}, "loads.md": {Data: loads}}
		s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "t.md")
		if s.Failed() {
			return
		}
		page := html.Append(nil, render.NewPage(s))
		if !utf8.Valid(page) || bytes.IndexByte(page, 0) >= 0 {
			t.Fatal("the page is no text")
		}
		if found := dangers(body(page)); found != nil {
			t.Fatalf("%q", found)
		}
		for _, tag := range []string{"div", "span", "math", "table", "p", "a"} {
			open := strings.Count(body(page), "<"+tag+">") + strings.Count(body(page), "<"+tag+" ")
			if shut := strings.Count(body(page), "</"+tag+">"); open != shut {
				t.Fatalf("%d <%s> are open and %d shut", open, tag, shut)
			}
		}
		if again := html.Append(nil, render.NewPage(s)); !bytes.Equal(again, page) {
			t.Fatal("other bytes the second time")
		}
	})
}
