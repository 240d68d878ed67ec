package main

import (
	"encoding/json"
	"errors"
	"io"
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
)

// order lists the packages so that each may import only those of the lines
// above its own; those of one line do not know each other.
var order = [][]string{
	{"units", "notebook/diag", "notebook/slab"},
	{"notebook/syntax"},
	{"notebook/check"},
	{"notebook/eval", "notebook/library"},
	{"notebook"},
	{"notebook/store"},
	{"notebook/register", "notebook/trace", "notebook/compare"},
	{"render/fonts"},
	{"render/maths"},
	{"render/figure"},
	{"render"},
	{"render/html", "render/pdf"},
	{"render/live"},
	{"cmd/gusset"},
}

const module = "gusset"

// listed is what the go command says of a package.
type listed struct {
	ImportPath string
	Imports    []string
	GoFiles    []string
}

// packages are those of the program; a folder with nothing but tests is none.
func packages(t *testing.T) []listed {
	t.Helper()
	cmd := exec.Command("go", "list", "-json=ImportPath,Imports,GoFiles", "./...")
	cmd.Dir = filepath.Join("..", "..")
	cmd.Stderr = os.Stderr
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("go list: %v", err)
	}
	var list []listed
	for d := json.NewDecoder(strings.NewReader(string(out))); ; {
		var p listed
		if err := d.Decode(&p); errors.Is(err, io.EOF) {
			break
		} else if err != nil {
			t.Fatal(err)
		}
		if len(p.GoFiles) > 0 {
			list = append(list, p)
		}
	}
	if len(list) < 10 {
		t.Fatalf("go list knows only %d packages", len(list))
	}
	return list
}

// TestImportsRunOneWay reads the import graph and fails on an arrow against the
// order, and on a package that has no place in it.
func TestImportsRunOneWay(t *testing.T) {
	for _, arrow := range wrongArrows(packages(t)) {
		t.Error(arrow)
	}
}

// TestWrongArrowsAreFound holds the reading of the graph to arrows that are wrong.
func TestWrongArrowsAreFound(t *testing.T) {
	list := []listed{
		{ImportPath: "gusset/units", Imports: []string{"gusset/notebook/diag"}},
		{ImportPath: "gusset/notebook/syntax", Imports: []string{"gusset/units", "fmt"}},
		{ImportPath: "gusset/notebook/eval", Imports: []string{"gusset/render"}},
		{ImportPath: "gusset/notebook/common"},
	}
	want := []string{
		"units imports notebook/diag, which stands no lower",
		"notebook/eval imports render, which stands no lower",
		"notebook/common has no place in the order of packages",
	}
	if got := wrongArrows(list); !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

func wrongArrows(list []listed) []string {
	rank := map[string]int{}
	for i, line := range order {
		for _, p := range line {
			rank[module+"/"+p] = i
		}
	}
	short := func(path string) string { return strings.TrimPrefix(path, module+"/") }
	var wrong []string
	for _, p := range list {
		from, known := rank[p.ImportPath]
		if !known {
			wrong = append(wrong, short(p.ImportPath)+" has no place in the order of packages")
			continue
		}
		for _, imported := range p.Imports {
			if to, ours := rank[imported]; ours && to >= from {
				wrong = append(wrong, short(p.ImportPath)+" imports "+short(imported)+", which stands no lower")
			}
		}
	}
	return wrong
}

// TestPackagesAreDescribed wants every package in the table of DEVELOPERS.md,
// and no other there.
func TestPackagesAreDescribed(t *testing.T) {
	text, err := os.ReadFile(filepath.Join("..", "..", "DEVELOPERS.md"))
	if err != nil {
		t.Fatal(err)
	}
	described := map[string]bool{}
	for line := range strings.Lines(string(text)) {
		if cell, _, ok := strings.Cut(strings.TrimPrefix(line, "| `"), "` |"); ok && strings.HasPrefix(line, "| `") && rankOf(cell) >= 0 {
			described[cell] = true
		}
	}
	for _, p := range packages(t) {
		name := strings.TrimPrefix(p.ImportPath, module+"/")
		if !described[name] {
			t.Errorf("%s is not in the table of packages in DEVELOPERS.md", name)
		}
		delete(described, name)
	}
	for name := range described {
		t.Errorf("DEVELOPERS.md describes %s, and there is no such package", name)
	}
}

// TestGuardsExist wants every test that DEVELOPERS.md names to be there.
func TestGuardsExist(t *testing.T) {
	root := filepath.Join("..", "..")
	var tests strings.Builder
	err := filepath.WalkDir(root, func(path string, _ fs.DirEntry, err error) error {
		if err == nil && strings.HasSuffix(path, "_test.go") {
			tests.WriteString(read(t, path))
		}
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	named := regexp.MustCompile("`((?:Test|Fuzz)\\w+)`").FindAllStringSubmatch(read(t, filepath.Join(root, "DEVELOPERS.md")), -1)
	if len(named) < 20 {
		t.Fatalf("DEVELOPERS.md names %d tests", len(named))
	}
	for _, name := range named {
		if !strings.Contains(tests.String(), "func "+name[1]+"(") {
			t.Errorf("DEVELOPERS.md names %s, and there is no such test", name[1])
		}
	}
}

func rankOf(name string) int {
	return slices.IndexFunc(order, func(line []string) bool { return slices.Contains(line, name) })
}
