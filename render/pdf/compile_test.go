package pdf

import (
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/render"
)

// front is the front matter that the tests' calcs begin with.
const front = "---\ncalc: C-1\ntitle: A lug\nrev: B\ndate: 2026-03-02\n---\n"

// compiled compiles a calc file, with other files beside it by name. Only
// warnings are allowed.
func compiled(t testing.TB, text string, files map[string]string) *notebook.Sheet {
	t.Helper()
	root := fstest.MapFS{"calc.md": {Data: []byte(text)}}
	for name, data := range files {
		root[name] = &fstest.MapFile{Data: []byte(data)}
	}
	s := notebook.Compile(&notebook.Context{FS: root, Panics: true}, "calc.md")
	for _, d := range s.Diagnostics {
		if d.Severity == diag.Error {
			t.Fatal(d.Text())
		}
	}
	return s
}

func pageOf(t testing.TB, text string, files map[string]string) *render.Page {
	t.Helper()
	return render.NewPage(compiled(t, text, files))
}
