package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/diag"
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

// TestReadme runs the commands of README.md that call the program.
func TestReadme(t *testing.T) {
	root, err := filepath.Abs(filepath.Join("..", ".."))
	if err != nil {
		t.Fatal(err)
	}
	dir := t.TempDir()
	if err := os.Symlink(filepath.Join(root, "examples"), filepath.Join(dir, "examples")); err != nil {
		t.Fatal(err)
	}
	ran := 0
	for line := range strings.Lines(read(t, filepath.Join(root, "README.md"))) {
		words := strings.Fields(line)
		if !strings.HasPrefix(line, "go run ./cmd/gusset ") {
			continue
		}
		ran++
		if out, status := gussetIn(t, dir, words[3:]...); status != 0 {
			t.Errorf("%s: status %d\n%s", strings.TrimSpace(line), status, out)
		}
	}
	if ran == 0 {
		t.Error("README.md calls the program nowhere")
	}
}

// TestReadmeNotation compiles the calc that README.md shows, and wants the message
// that it shows for a mistake in it.
func TestReadmeNotation(t *testing.T) {
	readme := read(t, filepath.Join("..", "..", "README.md"))
	_, rest, _ := strings.Cut(readme, "````markdown\n")
	calc, rest, ok := strings.Cut(rest, "````\n")
	_, rest, _ = strings.Cut(rest, "```text\n")
	message, _, ended := strings.Cut(rest, "```\n")
	if !ok || !ended {
		t.Fatal("README.md shows no calc or no message")
	}
	compile := func(calc string) *notebook.Sheet {
		fsys := fstest.MapFS{"lug.md": {Data: []byte(calc)}, "loads.md": {Data: []byte("---\ncalc: L-1\n---\n```calc\nP_u = 48 kN\n```\n")}}
		return notebook.Compile(&notebook.Context{FS: fsys, Panics: true}, "lug.md")
	}
	for _, d := range compile(calc).Diagnostics {
		if d.Severity < diag.Note {
			t.Error(d.Text())
		}
	}
	var lines []string
	for line := range strings.Lines(calc) {
		if strings.HasPrefix(line, "tau [MPa]") {
			line = "tau [MPa] = P/d\n"
		}
		lines = append(lines, line)
	}
	bad := compile(strings.Join(lines, ""))
	for _, d := range bad.Diagnostics {
		if d.Severity == diag.Error {
			if d.Text() != message {
				t.Errorf("README.md shows\n%sand the message is\n%s", message, d.Text())
			}
			return
		}
	}
	t.Error("the mistake draws no message")
}
