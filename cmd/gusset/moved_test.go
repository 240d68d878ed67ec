package main

import (
	"fmt"
	"slices"
	"testing"
	"testing/fstest"

	"gusset/notebook"
)

const movable = "---\ncalc: C-1\n---\n```calc\n"

// cases is a block of load cases with one force each; lines may follow it.
func cases(forces ...int) string {
	b := "```\n```cases\ncase | N [kN]\n"
	for i, n := range forces {
		b += fmt.Sprintf("LC%d | %d\n", i+1, n)
	}
	return b + "```\n```calc\n"
}

func sheetOf(t *testing.T, lines string) *notebook.Sheet {
	t.Helper()
	fsys := fstest.MapFS{"c.md": {Data: []byte(movable + lines + "\n```\n")}}
	s := notebook.Compile(&notebook.Context{FS: fsys, Panics: true}, "c.md")
	if s.Failed() {
		t.Fatalf("%s", s.Diagnostics[0].Text())
	}
	return s
}

func TestMoved(t *testing.T) {
	for _, test := range []struct {
		name, before, after string
		want                []string
	}{
		{"nothing", "a = 2 mm", "a = 2 mm # a note", nil},
		{"a value, its unit once", "a = 2 mm", "a = 3 mm", []string{"a 2 → 3 mm"}},
		{"another unit", "a = 2 mm", "a = 2 cm", []string{"a 2 mm → 2 cm"}},
		{"a number", "n = 2", "n = 3", []string{"n 2 → 3"}},
		{"a text", `g = "S 235"`, `g = "S 355"`, []string{"g S 235 → S 355"}},
		{"new and gone", "a = 2 mm", "b = 2 mm", []string{"b new", "a gone"}},
		{"a verdict goes first", "a = 2 mm\ncheck a <= 2 mm", "a = 3 mm\ncheck a <= 2 mm",
			[]string{"check (1) now NG", "a 2 → 3 mm"}},
		{"a verdict is matched by the check's text", "a = 2 mm\ncheck a <= 2 mm", "a = 3 mm\nb = 2*a\ncheck b <= 9 mm\ncheck a <= 2 mm",
			[]string{"check (2) new, OK", "check (3) now NG", "a 2 → 3 mm", "b new"}},
		{"checks of one text keep their order", "a = 2 mm\ncheck a <= 2 mm\ncheck a <= 2 mm", "a = 2 mm\ncheck a <= 2 mm",
			[]string{"check (2) gone"}},
		{"a check with another text", "a = 2 mm\ncheck a <= 3 mm\ncheck a <= 4 mm", "a = 2 mm\ncheck a <= 1 mm\ncheck a <= 5 mm",
			[]string{"check (1) rewritten, now NG", "check (2) rewritten, still OK"}},
		{"within the range", cases(10, 42, 55), cases(10, 43, 55), []string{"N at LC2 42 → 43 kN"}},
		{"several within the range, and what follows", cases(10, 42, 43, 55) + "M = N*2 m", cases(10, 44, 45, 55) + "M = N*2 m",
			[]string{"N at LC2 42 → 44 kN and 1 more", "M at LC2 84.00 → 88.00 kN·m and 1 more"}},
		{"more within the range", cases(55, 10), cases(55, 10, 42), []string{"case LC1, LC2 → LC1, LC2, LC3", "N 2 → 3 entries"}},
		{"the range", cases(10, 42), cases(10, 43), []string{"N 10 kN to 42 kN (LC2 governs) → 10 kN to 43 kN (LC2 governs)"}},
		{"not required any more", "a = 2 mm\ncheck a <= 2 mm if a > 1 mm", "a = 1 mm\ncheck a <= 2 mm if a > 1 mm",
			[]string{"check (1) now not required", "a 2 → 1 mm"}},
	} {
		if got := moved(sheetOf(t, test.before), sheetOf(t, test.after)); !slices.Equal(got, test.want) {
			t.Errorf("%s:\ngot  %q\nwant %q", test.name, got, test.want)
		}
	}
}

func TestMovedLine(t *testing.T) {
	for _, test := range []struct {
		list []string
		want string
	}{
		{nil, "no value moved"},
		{[]string{"a", "b"}, "a, b"},
		{[]string{"1", "2", "3", "4", "5", "6", "7"}, "1, 2, 3, 4, 5, 6, 7"},
		{[]string{"1", "2", "3", "4", "5", "6", "7", "8"}, "1, 2, 3, 4, 5, 6, and 2 more"},
	} {
		if got := movedLine(test.list); got != test.want {
			t.Errorf("got %q, want %q", got, test.want)
		}
	}
}

func TestBuildLine(t *testing.T) {
	of := func(lines ...string) (parts []buildPart) {
		for _, line := range lines {
			parts = append(parts, buildPart{line: line})
		}
		return parts
	}
	parts := of("a: "+nothingMoved, "b: x 1 → 2", "c: "+nothingMoved, "d", "e", "f", "g", "h")
	if got, want := buildLine(slices.Clone(parts)), "b: x 1 → 2; d; e; f; g; and 3 more calcs"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
	parts[7].saved = true // the calc that was saved, before those that rest on it
	if got, want := buildLine(parts), "h; b: x 1 → 2; d; e; f; and 3 more calcs"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
	if got, want := buildLine(of("a", "b")), "a; b"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}
