package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"gusset/notebook/store"
)

var examples = filepath.Join("..", "..", "examples")

// TestExamples compiles and prints every calc file of examples/: none has
// anything to be said about it, and no two come to one name.
func TestExamples(t *testing.T) {
	f := find([]string{examples})
	for _, err := range f.problems {
		t.Error(err)
	}
	if len(f.files) < 6 {
		t.Fatalf("there are only %d examples", len(f.files))
	}
	p := &printer{to: t.TempDir()}
	results := store.New().Compile(f.files)
	stems, clashes := p.stems(results)
	for _, err := range clashes {
		t.Error(err)
	}
	pages := p.writeAll(results, stems, func() {})
	for i, r := range results {
		if r.Err != nil {
			t.Error(r.Err)
			continue
		}
		for _, d := range r.Sheet.Diagnostics {
			t.Error(d.Text())
		}
		for _, d := range pages[i].warnings {
			t.Error(d.Text())
		}
		if pages[i].err != nil {
			t.Error(pages[i].err)
		}
		if len(pages[i].files) != 2 && !r.Sheet.Failed() {
			t.Errorf("%s: wrote %q", r.File, pages[i].files)
		}
		if list := listing(r.Sheet, false); strings.Contains(list, "not computed") || strings.Count(list, "\n") < 20 {
			t.Errorf("%s lists little:\n%s", r.File, list)
		}
	}
}

// TestExamplesAreDescribed wants each example named in examples/README.md.
func TestExamplesAreDescribed(t *testing.T) {
	text, err := os.ReadFile(filepath.Join(examples, "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	for _, file := range find([]string{examples}).files {
		name, err := filepath.Rel(examples, file)
		if err != nil {
			t.Fatal(err)
		}
		if !strings.Contains(string(text), filepath.ToSlash(name)) {
			t.Errorf("examples/README.md does not name %s", name)
		}
	}
}
