package library_test

import (
	"fmt"
	"math"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/notebook/library"
	"gusset/notebook/syntax"
)

// row is a call of a helper beside what it must give.
type row struct {
	setup  string // blocks and lines above the call
	call   string
	want   string  // `r.tau = 50 MPa; r.A = pi*(10 mm)^2/4`; r is the call's value
	tol    float64 // relative, or absolute where 0 is wanted; 1e-9 where it is 0 here
	source string  // where the figure comes from
}

// name is the helper that a row calls.
func (r row) name() string {
	name, _, _ := strings.Cut(r.call, "(")
	return name
}

// wants cuts a row's wants into pairs of expressions.
func (r row) wants(t *testing.T) [][2]string {
	t.Helper()
	var pairs [][2]string
	for want := range strings.SplitSeq(r.want, ";") {
		got, expected, ok := strings.Cut(want, " = ")
		if !ok {
			t.Fatalf("%s: `%s` is no want", r.call, want)
		}
		pairs = append(pairs, [2]string{strings.TrimSpace(got), strings.TrimSpace(expected)})
	}
	return pairs
}

// source is a calc file of the given blocks and lines: fences pass as they are.
func source(blocks string) string {
	var b strings.Builder
	b.WriteString("---\ncalc: T-1\nfigures: 6\n---\n")
	in := false // in a calc fence of ours
	fenced := false
	for line := range strings.SplitSeq(blocks, "\n") {
		switch {
		case strings.HasPrefix(line, "```"):
			if in {
				b.WriteString("```\n\n")
				in = false
			}
			fenced = !fenced
		case !fenced && !in && line != "":
			b.WriteString("\n```calc\n")
			in = true
		}
		b.WriteString(line + "\n")
	}
	if in {
		b.WriteString("```\n")
	}
	return b.String()
}

// compile compiles a calc file of the given blocks and lines.
func compile(blocks string) *notebook.Sheet {
	fsys := fstest.MapFS{"calc.md": {Data: []byte(source(blocks))}}
	return notebook.Compile(&notebook.Context{FS: fsys, Panics: true}, "calc.md")
}

// messages prints what is wrong with a calc, notes left out.
func messages(s *notebook.Sheet) string {
	var b strings.Builder
	for _, d := range s.Diagnostics {
		if d.Severity != diag.Note {
			line, _ := d.Source.Position(d.Span.Start)
			fmt.Fprintf(&b, "%d: %s: %s %q\n", line, d.ID, d.Message, d.Hints)
		}
	}
	return b.String()
}

// step finds a value by its name.
func step(s *notebook.Sheet, id string) *eval.Step {
	for _, st := range s.Steps {
		if st.ID == id && !st.Failed {
			return st
		}
		for _, r := range st.Results {
			if r.ID == id && !st.Failed {
				return r
			}
		}
	}
	return nil
}

// number returns a plain value in coherent SI.
func number(t *testing.T, s *notebook.Sheet, id string) float64 {
	t.Helper()
	st := step(s, id)
	if st == nil || len(st.Value.Num) != 1 {
		t.Fatalf("no plain value %s\n%s", id, messages(s))
	}
	return st.Value.Num[0]
}

// near compares relatively, or absolutely where 0 is wanted.
func near(got, want, tol float64) bool {
	if tol == 0 {
		tol = 1e-9
	}
	if want == 0 {
		return math.Abs(got) <= tol
	}
	return math.Abs(got-want) <= tol*math.Abs(want)
}

// helpers are the library's, by name.
func helpers(t *testing.T) map[string]*syntax.Helper {
	t.Helper()
	all := map[string]*syntax.Helper{}
	for _, name := range library.Load().Names {
		all[name] = library.Load().Read(name)
	}
	return all
}
