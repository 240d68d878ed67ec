package store

import (
	"os"
	"path/filepath"
	"testing"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// A given that only another calc uses is not unused where both are compiled.
func TestTogether(t *testing.T) {
	dir := t.TempDir()
	var files []string
	for _, f := range [][2]string{
		{"loads.md", "---\ncalc: L\n---\n```calc\nP = 3 kN # Pull [brief]\nQ = 4 kN # Push [brief]\n```\n```cases # Cases [brief]\ncase | N [kN]\nLC1 | 1\n```\n"},
		{"lug.md", "---\ncalc: C\nfrom: {loads: loads.md}\n---\n```calc\nR = 2*loads.P + loads.N\n```\n"},
	} {
		name := filepath.Join(dir, f[0])
		if err := os.WriteFile(name, []byte(f[1]), 0o644); err != nil {
			t.Fatal(err)
		}
		files = append(files, name)
	}
	unused := func(s *notebook.Sheet) (names []string) {
		for _, d := range s.Diagnostics {
			if d.ID == diag.UnusedValue {
				names = append(names, s.Source.Slice(d.Span))
			}
		}
		return names
	}
	results := New().Compile(files)
	sheets := []*notebook.Sheet{results[0].Sheet, results[1].Sheet}
	if got := unused(sheets[0]); len(got) != 3 {
		t.Fatalf("alone: %q", got)
	}
	if got := unused(notebook.Together(sheets)[0]); len(got) != 1 || got[0] != "Q" {
		t.Errorf("together: %q", got)
	}
}
