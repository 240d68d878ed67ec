// Package examples_test holds the calc files of this folder to what they say:
// they compile without a diagnostic, every number they print has its root in a
// given, and what governs is confirmed by another route.
package examples_test

import (
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"testing"

	"gusset/notebook"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render"
	"gusset/render/html"
)

// calcs are the calc files of this folder and those below it.
func calcs(t *testing.T) []string {
	t.Helper()
	var list []string
	err := filepath.WalkDir(".", func(path string, _ fs.DirEntry, err error) error {
		if err != nil || filepath.Ext(path) != ".md" {
			return err
		}
		text, err := os.ReadFile(path)
		if err == nil && notebook.IsCalc(text) {
			list = append(list, path)
		}
		return err
	})
	if err != nil || len(list) < 12 {
		t.Fatalf("found %d calc files: %v", len(list), err)
	}
	return list
}

func open(t *testing.T, path string) *notebook.Sheet {
	t.Helper()
	s, err := notebook.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// each runs a test for each calc file.
func each(t *testing.T, f func(t *testing.T, path string, s *notebook.Sheet)) {
	for _, path := range calcs(t) {
		t.Run(filepath.ToSlash(path), func(t *testing.T) { f(t, path, open(t, path)) })
	}
}

// A client could get any of these: no error, no warning, no note, no check NG.
func TestExamplesAreClean(t *testing.T) {
	each(t, func(t *testing.T, _ string, s *notebook.Sheet) {
		for _, d := range s.Diagnostics {
			t.Errorf("%s", d.Text())
		}
		for _, st := range s.Steps {
			if st.Check != nil && !st.Check.AllOK {
				t.Errorf("check (%s) is NG: %s", st.Number, st.Note)
			}
		}
	})
}

// Every example is named in the README, and nothing else is.
func TestReadmeNamesEveryExample(t *testing.T) {
	text, err := os.ReadFile("README.md")
	if err != nil {
		t.Fatal(err)
	}
	named := map[string]bool{}
	for _, m := range regexp.MustCompile(`\(([\w/.-]+\.md)\)`).FindAllStringSubmatch(string(text), -1) {
		named[m[1]] = true
	}
	for _, path := range calcs(t) {
		if !named[filepath.ToSlash(path)] {
			t.Errorf("README.md does not name %s", path)
		}
		delete(named, filepath.ToSlash(path))
	}
	for name := range named {
		t.Errorf("README.md names %s, which is no calc file here", name)
	}
}

// Every line says what it is; every given says where it comes from.
func TestLinesAreExplained(t *testing.T) {
	each(t, func(t *testing.T, _ string, s *notebook.Sheet) {
		sourced := map[*eval.Step]bool{}
		for _, b := range s.Blocks {
			if b.Source == "" {
				continue
			}
			for _, st := range b.Steps {
				sourced[st] = true
			}
		}
		for _, st := range s.Steps {
			switch {
			case sourced[st]: // the columns of a schedule
			case st.Kind == eval.Given:
				if st.Source == "" {
					t.Errorf("line %d: %s has no source", st.Line, st.ID)
				}
			case st.Kind == eval.Computed || st.Kind == eval.Check:
				if st.Note == "" && st.Source == "" {
					t.Errorf("line %d: %s%s has no note", st.Line, st.ID, st.Number)
				}
			}
		}
	})
}

// walker follows what a calc computes down to its roots.
type walker struct {
	t      *testing.T
	dir    string                    // of the calc
	line   map[*eval.Step]*eval.Step // the line that a step stands in: itself, or the one whose helper gives it
	rooted map[*eval.Step]bool
}

func newWalker(t *testing.T, path string, s *notebook.Sheet) *walker {
	w := &walker{t: t, dir: filepath.Dir(path), line: map[*eval.Step]*eval.Step{}, rooted: map[*eval.Step]bool{}}
	for _, st := range s.Steps {
		w.line[st] = st
		for _, r := range st.Results {
			w.line[r] = st
		}
	}
	return w
}

// walk follows a step to givens, constants and carried values.
func (w *walker) walk(st *eval.Step, depth int) {
	if w.rooted[st] {
		return
	}
	if depth > 200 {
		w.t.Fatalf("%s has no root within 200 steps", st.ID)
	}
	w.rooted[st] = true
	if st.Failed {
		w.t.Errorf("line %d: %s was not computed", st.Line, st.ID)
		return
	}
	if st.Origin != nil {
		w.carried(st)
		return
	}
	switch st.Kind {
	case eval.Given:
		if st.Literal == nil && len(st.Value.Text) == 0 && len(st.Cells) == 0 {
			w.t.Errorf("line %d: the given %s has no figures of its author's", st.Line, st.ID)
		}
	case eval.Constant:
		if st.ID != "pi" && st.ID != "g_n" {
			w.t.Errorf("%s is no constant of the notation", st.ID)
		}
	case eval.Carried:
		w.t.Errorf("line %d: %s is carried from nowhere", st.Line, st.ID)
	case eval.Computed, eval.Check, eval.Function:
		w.uses(st, depth)
	}
}

func (w *walker) carried(st *eval.Step) {
	if st.Origin.Step == nil || st.Origin.Calc == "" {
		w.t.Errorf("line %d: %s does not say where it is carried from", st.Line, st.ID)
		return
	}
	path := filepath.Join(w.dir, filepath.Base(st.Origin.Path))
	from := open(w.t, path)
	for _, o := range from.Steps {
		if o.ID == st.Origin.Step.ID {
			newWalker(w.t, path, from).walk(o, 0)
			return
		}
	}
	w.t.Errorf("line %d: %s is not in %s", st.Line, st.Origin.Step.ID, st.Origin.Path)
}

// uses follows what a line uses: values of the calc defined above it, or, for
// the lines of a helper, its arguments and the helper's lines above.
func (w *walker) uses(st *eval.Step, depth int) {
	roots := 0
	for _, u := range st.Uses {
		if u == nil { // a function, a parameter, the name that `first of` tries
			continue
		}
		roots++
		line := w.line[u]
		switch {
		case line == nil && u.Kind != eval.Constant:
			w.t.Errorf("line %d: %s uses %s, which is no line of the calc", st.Line, st.ID, u.ID)
		case line == nil:
			w.walk(u, depth+1)
		case line.Line > st.Line:
			w.t.Errorf("line %d: %s uses %s of line %d below", st.Line, st.ID, u.ID, line.Line)
		default:
			w.walk(line, depth+1)
		}
	}
	if roots == 0 && st.Kind == eval.Computed && len(st.Calls) == 0 && len(st.Cells) == 0 && st.Source == "" {
		w.t.Errorf("line %d: %s rests on nothing", st.Line, st.ID)
	}
	for _, call := range st.Calls {
		w.call(st, call)
	}
}

// call holds the lines of a helper to its arguments and to each other; a
// function of the author's own may use lines of the calc too.
func (w *walker) call(st *eval.Step, call *eval.Call) {
	known := map[*eval.Step]bool{}
	for _, a := range call.Args {
		known[a] = true
	}
	for _, in := range call.Steps {
		known[in] = true
		for _, u := range in.Uses {
			outside := u != nil && !known[u] && u.ID != "pi" && u.ID != "g_n"
			if call.Helper == nil && outside && w.line[u] != nil {
				w.walk(w.line[u], 1)
			} else if outside {
				w.t.Errorf("line %d: in %s, %s uses %s from outside", st.Line, call.Expr.Fun.ID, in.ID, u.ID)
			}
		}
		for _, inner := range in.Calls {
			w.call(in, inner)
		}
	}
}

// Each value and each check leads to givens, constants and carried values.
func TestEveryValueHasItsRoots(t *testing.T) {
	each(t, func(t *testing.T, path string, s *notebook.Sheet) {
		w := newWalker(t, path, s)
		for _, st := range s.Steps {
			w.walk(st, 0)
		}
	})
}

// Each value in the text is a step of the calc, printed as it was computed.
func TestEveryValueInTextIsAStep(t *testing.T) {
	each(t, func(t *testing.T, path string, s *notebook.Sheet) {
		w := newWalker(t, path, s)
		if len(s.Refs) == 0 && len(s.Headings) > 0 && s.Headings[0].Text == "Summary" {
			t.Error("the summary names no value")
		}
		for _, r := range s.Refs {
			if r.Step == nil || w.line[r.Step] == nil {
				t.Errorf("{%s} is no step", r.Text)
			}
		}
	})
}

var (
	unprinted = regexp.MustCompile(`(?s)<svg.*?</svg>|<style.*?</style>|<head>.*?</head>`)
	tags      = regexp.MustCompile(`<[^>]*>|&#?\w+;`)
	number    = regexp.MustCompile(`\d+(\.\d+)?|\.\d+`)
)

// numbers adds the figures that stand in a text.
func numbers(known map[string]bool, texts ...string) {
	for _, text := range texts {
		for _, n := range number.FindAllString(text, -1) {
			known[n] = true
		}
	}
}

// printed adds the figures of a step, of its helpers' lines and of its check.
func printed(known map[string]bool, st *eval.Step) {
	numbers(known, st.Number)
	if st.Value.Len() > 0 {
		for i := range st.Value.Len() {
			numbers(known, eval.PlainText(st.Printed(i)))
		}
	}
	for _, u := range st.Uses {
		if u != nil && u.Kind == eval.Constant && len(u.Value.Num) == 1 {
			numbers(known, eval.PlainText(u.Printed(0)))
		}
	}
	if def, ok := st.Stmt.(*syntax.Definition); ok {
		for _, w := range def.Where { // a rule takes its values as plain numbers of these units
			for _, u := range st.Uses {
				if u == nil || u.Kind != eval.Constant && u.Literal != nil {
					continue
				}
				for i := range u.Value.Num {
					numbers(known, eval.PlainText(u.Value.Printed(i, w.Unit.Unit, u.Figures)))
				}
			}
		}
	}
	for _, trial := range st.Trials {
		numbers(known, trial.Value, trial.Why)
	}
	for _, r := range st.Results {
		printed(known, r)
	}
	for _, call := range st.Calls {
		for _, in := range slices.Concat(call.Args, call.Steps) {
			printed(known, in)
		}
	}
	if c := st.Check; c != nil {
		known[strconv.Itoa(len(c.OK))] = true // entries checked
		for i, ratio := range c.Ratio {
			numbers(known, eval.UtilisationText(ratio, c.OK[i], c.Equal))
		}
		for _, side := range slices.Concat(c.Sides, c.NeededIf) {
			for i := range side.Value.Len() {
				numbers(known, eval.PlainText(side.Value.Printed(i, side.Unit, side.Figures)))
			}
		}
	}
}

// Each figure on the page outside its drawings is one of: the author's, a
// step's as computed, one of the library's, a number of a line, of a section or
// of a remark, a count of entries. None comes from anywhere else.
func TestEveryNumberOnThePageIsKnown(t *testing.T) {
	lib := map[string]bool{}
	files, err := filepath.Glob("../notebook/library/*.[mc][ds]*")
	if err != nil || len(files) < 20 {
		t.Fatalf("found %d files of the library: %v", len(files), err)
	}
	for _, file := range files {
		text, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		numbers(lib, string(text))
	}
	each(t, func(t *testing.T, path string, s *notebook.Sheet) {
		known := map[string]bool{"10": true} // the base of powers
		for _, file := range s.Files {
			if text, err := os.ReadFile(filepath.Join(filepath.Dir(path), filepath.Base(filepath.FromSlash(file)))); err == nil {
				numbers(known, string(text))
			}
		}
		for _, h := range s.Headings {
			numbers(known, h.Number)
		}
		for _, r := range s.Remarks {
			numbers(known, r.Number)
		}
		for _, b := range s.Blocks {
			numbers(known, b.Number)
		}
		for _, st := range s.Steps {
			printed(known, st)
		}
		for _, r := range s.Refs {
			numbers(known, r.Text)
		}
		page := render.NewPage(s)
		for _, entries := range page.Blocks {
			for _, e := range entries {
				for _, table := range e.Tables { // rows left out on paper
					known[strconv.Itoa(table.Rows)], known[strconv.Itoa(table.Left())] = true, true
				}
			}
		}
		text := string(html.Append(nil, page))
		text = tags.ReplaceAllString(unprinted.ReplaceAllString(text, " "), " ")
		for _, n := range number.FindAllString(text, -1) {
			if !known[n] && !lib[n] {
				t.Errorf("%s is on the page, but no step and no author gives it", n)
			}
		}
	})
}

// Each curve of a plot passes through the value that the calc itself has.
func TestPlotsMeetTheCalc(t *testing.T) {
	found := 0
	each(t, func(t *testing.T, _ string, s *notebook.Sheet) {
		for _, b := range s.Blocks {
			if b.Plot == nil || b.Plot.Checks {
				continue
			}
			for _, c := range b.Plot.Curves {
				found++
				i, _ := slices.BinarySearch(c.X, b.Plot.At)
				i = min(max(i, 1), len(c.X)-1)
				part := (b.Plot.At - c.X[i-1]) / (c.X[i] - c.X[i-1])
				if got := c.Y[i-1] + part*(c.Y[i]-c.Y[i-1]); math.Abs(got-c.At) > 2e-3*math.Abs(c.At) {
					t.Errorf("plot %s: %s is %g on the curve and %g in the calc", b.Number, c.ID, got, c.At)
				}
			}
		}
	})
	if found < 8 {
		t.Errorf("only %d curves in all examples", found)
	}
}
