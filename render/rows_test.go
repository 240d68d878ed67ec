package render_test

import (
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/render"
)

// Two sets of rows of one name bear the keys of their files in the heads of a
// table; sets of different names do without.
func TestRowsOfOneName(t *testing.T) {
	file := func(text string) *fstest.MapFile { return &fstest.MapFile{Data: []byte(text)} }
	plates := func(marks string) *fstest.MapFile {
		return file("---\ncalc: P\n---\n```schedule plates\nm | F [kN]\n" + marks + "1 | 1\n" + marks + "2 | 2\n```\n```calc\nF = plates.F\n```\n")
	}
	s := notebook.Compile(&notebook.Context{Panics: true, FS: fstest.MapFS{
		"a.md": plates("A"), "b.md": plates("B"),
		"calc.md": file("---\ncalc: T\nfrom: {a: a.md, b: b.md}\n---\n```schedule bolts\nm | n\nZ1 | 1\nZ2 | 2\n```\n" +
			"```calc\nt = a.F + b.F\n\nu = a.F*bolts.n\ncheck a.F + b.F <= 9 kN\n```\n"),
	}}, "calc.md")
	if s.Failed() {
		t.Fatal(s.Diagnostics[0].Text())
	}
	var got [][]string
	for _, b := range render.NewPage(s).Blocks {
		for _, e := range b {
			for _, table := range e.Tables {
				words := []string{table.Caption}
				for _, h := range table.Heads {
					if h.Words != "" {
						words = append(words, h.Words)
					}
				}
				got = append(got, words)
			}
		}
	}
	want := [][]string{
		{"", "m"},
		{"", "a.plates", "b.plates"},
		{"", "plates", "bolts"},
		{"largest for each of a.plates", "a.plates", "at b.plates", "utilisation", "verdict"},
		{"largest for each of b.plates", "b.plates", "at a.plates", "utilisation", "verdict"},
	}
	if len(got) != len(want) {
		t.Fatalf("%q", got)
	}
	for i := range want {
		for k := range want[i] {
			if len(got[i]) != len(want[i]) || got[i][k] != want[i][k] {
				t.Errorf("table %d: %q, want %q", i, got[i], want[i])
				break
			}
		}
	}
}
