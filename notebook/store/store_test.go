package store

import (
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// folder writes files into a new folder and returns it.
func folder(t *testing.T, pairs ...string) string {
	t.Helper()
	dir := t.TempDir()
	for i := 0; i < len(pairs); i += 2 {
		write(t, filepath.Join(dir, pairs[i]), pairs[i+1])
	}
	return dir
}

func write(t *testing.T, path, text string) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
}

func calc(number, keys, block string) string {
	return "---\ncalc: " + number + "\n" + keys + "---\n\n```calc\n" + block + "\n```\n"
}

// sheets compiles files of a folder, all of which can be read.
func sheets(t *testing.T, s *Store, dir string, names ...string) []*notebook.Sheet {
	t.Helper()
	var files []string
	for _, n := range names {
		files = append(files, filepath.Join(dir, n))
	}
	var out []*notebook.Sheet
	for _, r := range s.Compile(files) {
		if r.Err != nil {
			t.Fatal(r.Err)
		}
		out = append(out, r.Sheet)
	}
	return out
}

func errorIDs(s *notebook.Sheet) string {
	var ids []string
	for _, d := range s.Diagnostics {
		if d.Severity == diag.Error {
			ids = append(ids, d.ID)
		}
	}
	return strings.Join(ids, " ")
}

// Only what changed and what rests on it is made anew.
func TestRecompilesWhatDepends(t *testing.T) {
	dir := folder(t,
		"register.yaml", "firm: Works\n",
		"loads.md", calc("C-0", "", "P = 48 kN  # Pull [load schedule]"),
		"lug.md", calc("C-1", "from: {loads: loads.md}\n", "Q = 2*loads.P"),
		"splice.md", calc("C-2", "from: {lug: lug.md}\n", "R = 2*lug.Q"),
		"other.md", calc("C-3", "helpers: {shop: shop.md}\n", "w = 1 m  # Width [drawing]"),
		"shop.md", "# Shop\n",
	)
	s := New()
	names := []string{"splice.md", "lug.md", "other.md", "loads.md"}
	first := sheets(t, s, dir, names...)
	same := func(want string) {
		t.Helper()
		now := sheets(t, s, dir, names...)
		var got []string
		for i, sheet := range now {
			if sheet != first[i] {
				got = append(got, names[i])
			}
		}
		if d := cmp.Diff(want, strings.Join(got, " ")); d != "" {
			t.Error(d)
		}
		first = now
	}
	same("")
	s.Changed([]string{filepath.Join(dir, "lug.md")})
	same("splice.md lug.md")
	s.Changed([]string{filepath.Join(dir, "loads.md")})
	same("splice.md lug.md loads.md")
	s.Changed([]string{filepath.Join(dir, "shop.md")})
	same("other.md")
	s.Changed([]string{filepath.Join(dir, "nothing.md")})
	same("")
	s.Changed([]string{filepath.Join(dir, "register.yaml")})
	same("splice.md lug.md other.md loads.md")
	s.Changed([]string{dir})
	same("splice.md lug.md other.md loads.md")
}

// Each file is compiled once, whichever way it is reached, so that two routes
// lead to one set of rows.
func TestCarriedOnce(t *testing.T) {
	dir := folder(t,
		"register.yaml", "",
		"base.md", "---\ncalc: C-0\n---\n\n```cases\ncase | P [kN]\nLC1 | 1\nLC2 | 2\n```\n",
		"left.md", calc("C-1", "from: {base: base.md}\n", "L = 2*base.P"),
		"right.md", calc("C-2", "from: {base: base.md}\n", "R = 3*base.P"),
		"top.md", calc("C-3", "from: {left: left.md, right: right.md}\n", "S = left.L + right.R"),
	)
	got := sheets(t, New(), dir, "top.md", "left.md", "right.md", "base.md")
	if ids := errorIDs(got[0]); ids != "" {
		t.Fatal(got[0].Diagnostics[0].Text())
	}
	want := []string{"base.md", "left.md", "register.yaml", "right.md", "top.md"}
	if d := cmp.Diff(want, got[0].Files); d != "" {
		t.Error(d)
	}
}

// A cycle is reported in each of its files, and mending one file mends all.
func TestCycle(t *testing.T) {
	dir := folder(t,
		"register.yaml", "",
		"a.md", calc("C-1", "from: {b: b.md}\n", "x = 1 m"),
		"b.md", calc("C-2", "from: {a: a.md}\n", "y = 1 m"),
		"c.md", calc("C-3", "from: {a: a.md}\n", "z = 1 m"),
	)
	s := New()
	for range 3 {
		got := sheets(t, s, dir, "c.md", "b.md", "a.md")
		if ids := errorIDs(got[0]) + "|" + errorIDs(got[1]) + "|" + errorIDs(got[2]); ids != "carried-failed|carried-cycle|carried-cycle" {
			t.Fatal(ids)
		}
	}
	write(t, filepath.Join(dir, "b.md"), calc("C-2", "", "y = 1 m"))
	s.Changed([]string{filepath.Join(dir, "b.md")})
	for _, sheet := range sheets(t, s, dir, "c.md", "b.md", "a.md") {
		if ids := errorIDs(sheet); ids != "" {
			t.Error(sheet.Path, ids)
		}
	}
}

// A file that is named through a link within the root changes by either name.
func TestChangesThroughLinks(t *testing.T) {
	dir := folder(t, "register.yaml", "", "lib/loads.md", calc("C-0", "", "P = 48 kN  # Pull [load schedule]"),
		"lug.md", calc("C-1", "from: {loads: link/loads.md}\n", "Q = 2*loads.P"))
	if err := os.Symlink("lib", filepath.Join(dir, "link")); err != nil {
		t.Skip(err)
	}
	s := New()
	before := sheets(t, s, dir, "lug.md")[0]
	write(t, filepath.Join(dir, "lib", "loads.md"), calc("C-0", "", "P = 50 kN  # Pull [load schedule]"))
	named := slices.IndexFunc(s.Files(), func(f string) bool { return strings.HasSuffix(f, filepath.Join("link", "loads.md")) })
	if named < 0 {
		t.Fatal(s.Files())
	}
	s.Changed(s.Files()[named : named+1])
	after := sheets(t, s, dir, "lug.md")[0]
	if before.Failed() || after.Failed() || after.Steps[0].Value.Num[0] != 100e3 {
		t.Error(after.Steps[0].Value.Num, after.Diagnostics)
	}
	if got := s.Depends(filepath.Join(dir, "link", "loads.md")); len(got) != 2 {
		t.Error(got)
	}
}

// What was looked for in vain is watched, and taken up when it comes.
func TestMissingThenThere(t *testing.T) {
	dir := folder(t, "lug.md", calc("C-1", "from: {loads: loads.md}\n", "Q = 2*loads.P"))
	s := New()
	if ids := errorIDs(sheets(t, s, dir, "lug.md")[0]); ids != "missing-file" {
		t.Fatal(ids)
	}
	base := dir
	if real, err := filepath.EvalSymlinks(dir); err == nil {
		base = real
	}
	want := []string{filepath.Join(base, "loads.md"), filepath.Join(base, "lug.md"), filepath.Join(base, "register.yaml")}
	if d := cmp.Diff(want, s.Files()); d != "" {
		t.Error(d)
	}
	if d := cmp.Diff([]string{filepath.Join(base, "lug.md"), filepath.Join(base, "loads.md")}, s.Depends(filepath.Join(dir, "loads.md")), cmp.Transformer("sort", func(in []string) map[string]bool {
		out := map[string]bool{}
		for _, x := range in {
			out[x] = true
		}
		return out
	})); d != "" {
		t.Error(d)
	}
	write(t, filepath.Join(dir, "loads.md"), calc("C-0", "", "P = 48 kN  # Pull [load schedule]"))
	s.Changed([]string{filepath.Join(dir, "loads.md")})
	if ids := errorIDs(sheets(t, s, dir, "lug.md")[0]); ids != "" {
		t.Error(ids)
	}
	write(t, filepath.Join(dir, "register.yaml"), "firm: Works\n")
	s.Changed([]string{filepath.Join(dir, "register.yaml")})
	if got := sheets(t, s, dir, "lug.md")[0].Front.Firm; got != "Works" {
		t.Errorf("firm is %q", got)
	}
	if err := os.Remove(filepath.Join(dir, "lug.md")); err != nil {
		t.Fatal(err)
	}
	s.Changed([]string{filepath.Join(dir, "lug.md")})
	if r := s.Compile([]string{filepath.Join(dir, "lug.md")})[0]; r.Err == nil || r.Sheet != nil || !strings.Contains(r.Err.Error(), "there is no such file") {
		t.Error(r.Err)
	}
}

// Files of several roots compile together, and what cannot be read does not
// keep the others.
func TestRoots(t *testing.T) {
	one := folder(t, "a.md", calc("C-1", "", "x = 1 m"))
	two := folder(t, "register.yaml", "firm: Two\n", "sub/b.md", calc("C-2", "from: {c: ../c.md}\n", "y = 2*c.z"), "c.md", calc("C-3", "", "z = 1 m"))
	got := New().Compile([]string{
		filepath.Join(one, "a.md"), filepath.Join(one, "none.md"), one, filepath.Join(two, "sub", "b.md"), filepath.Join(one, "a.md"),
	})
	if got[0].Err != nil || got[3].Err != nil || got[1].Err == nil || got[2].Err == nil {
		t.Fatal(got)
	}
	if got[0].Sheet != got[4].Sheet {
		t.Error("a file named twice was compiled twice")
	}
	if b := got[3].Sheet; b.Front.Firm != "Two" || errorIDs(b) != "" || b.Path != "sub/b.md" {
		t.Error(b.Front.Firm, errorIDs(b), b.Path)
	}
}

// The store holds what the last call needed.
func TestPrunes(t *testing.T) {
	dir := folder(t, "register.yaml", "", "a.md", calc("C-1", "", "x = 1 m"), "b.md", calc("C-2", "", "x = 1 m"))
	s := New()
	sheets(t, s, dir, "a.md", "b.md")
	sheets(t, s, dir, "b.md")
	if files := s.Files(); len(files) != 2 || !strings.HasSuffix(files[0], "b.md") {
		t.Error(files)
	}
	s.Compile(nil)
	if files := s.Files(); files != nil {
		t.Error(files)
	}
}

// Calls from many goroutines do not disturb each other; run with -race.
func TestManyAtOnce(t *testing.T) {
	pairs := []string{"register.yaml", "", "base.md", calc("C-0", "", "x = 1 m")}
	var names []string
	for i := range 20 {
		name := fmt.Sprintf("c%d.md", i)
		names = append(names, name)
		pairs = append(pairs, name, calc(fmt.Sprint("C-", i+1), "from: {base: base.md}\n", "y = 2*base.x"))
	}
	dir := folder(t, pairs...)
	s := New()
	var wait sync.WaitGroup
	for i := range 8 {
		wait.Add(1)
		go func() {
			defer wait.Done()
			s.Changed([]string{filepath.Join(dir, names[i])})
			for _, r := range s.Compile([]string{filepath.Join(dir, names[i]), filepath.Join(dir, names[19-i])}) {
				if r.Err != nil || r.Sheet.Failed() {
					t.Error(r)
				}
			}
			s.Files()
			s.Depends(filepath.Join(dir, "base.md"))
		}()
	}
	wait.Wait()
}
