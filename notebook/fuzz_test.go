package notebook

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"testing/fstest"
	"unicode/utf8"

	"github.com/rogpeppe/go-internal/txtar"
	"github.com/yuin/goldmark/ast"

	"gusset/notebook/eval"
)

// FuzzCompile compiles whole files of any bytes. Whatever they are, there is a
// sheet that can be shown: its diagnostics lie within their sources, its JSON is
// JSON, its tree has no node that a page writer does not know, and compiling again
// gives the same.
func FuzzCompile(f *testing.F) {
	for _, pattern := range []string{"testdata/faults/*.txtar", "testdata/json/*.txtar", "../testdata/conformance/*.txtar"} {
		names, err := filepath.Glob(pattern)
		if err != nil {
			f.Fatal(err)
		}
		for _, name := range names {
			archive, err := txtar.ParseFile(name)
			if err != nil {
				f.Fatal(err)
			}
			for _, file := range archive.Files {
				if filepath.Ext(file.Name) == ".md" {
					f.Add(file.Data)
					if _, body, ok := cutFront(file.Data); ok {
						f.Add(file.Data[body:])
					}
				}
			}
		}
	}
	examples, err := filepath.Glob("../examples/*.md")
	if err != nil {
		f.Fatal(err)
	}
	for _, name := range examples {
		text, err := os.ReadFile(name)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text)
	}
	_, parts := Notation()
	for _, p := range parts {
		for _, ex := range examplesIn(f, p) {
			f.Add([]byte(ex.body))
		}
	}
	loads := []byte("---\ncalc: C-101\n---\n\n```calc\nP_u = 48 kN\nP = 3 m\n```\n\n```cases\ncase | N [kN]\nLC1 | 1\nLC2 | 2\n```\n")
	f.Fuzz(func(t *testing.T, text []byte) {
		if !bytes.HasPrefix(text, []byte("---")) { // most changes to a whole file end in its front matter
			text = append([]byte("---\ncalc: C-1\nfrom: {loads: loads.md}\n---\n"), text...)
		}
		root := fstest.MapFS{"calc.md": {Data: text}, "loads.md": {Data: loads}, "shop.md": {Data: []byte("# Shop\n")}}
		s := compile(root, "calc.md")
		sound(t, s)
		again := compile(root, "calc.md")
		if a, b := s.JSON(), again.JSON(); !bytes.Equal(a, b) {
			t.Errorf("two compilations differ:\n%s\n%s", a, b)
		}
	})
}

// sound checks what holds of every sheet.
func sound(t *testing.T, s *Sheet) {
	t.Helper()
	raw := s.JSON()
	if !json.Valid(raw) || !utf8.Valid(raw) || bytes.IndexByte(raw, '\n') >= 0 {
		t.Errorf("no JSON on one line: %s", raw)
	}
	for _, d := range s.Diagnostics {
		if d.Source == nil || d.Span.Start < 0 || d.Span.End < d.Span.Start || d.Span.End > len(d.Source.Text) || d.ID == "" || d.Message == "" {
			t.Errorf("a diagnostic without a place: %+v", d)
		}
		if !utf8.ValidString(d.Text()) {
			t.Errorf("a diagnostic that is no text: %q", d.Text())
		}
	}
	fences, values := 0, 0
	for n := range nodes(s.Doc) {
		switch n := n.(type) {
		case *FenceNode:
			fences++
			if n.Index >= len(s.Blocks) {
				t.Errorf("a fence without a block")
			}
		case *ValueNode:
			values++
			if n.Index >= len(s.Refs) {
				t.Errorf("a value that is not resolved")
			}
		case *ast.RawHTML, *ast.HTMLBlock:
			t.Errorf("raw HTML in the tree")
		case *ast.Link:
			if _, scheme := destination(n.Destination); scheme != "" && scheme != "http" && scheme != "https" && scheme != "mailto" && scheme != "tel" {
				t.Errorf("a link to %s", n.Destination)
			}
		}
	}
	if fences != len(s.Blocks) || values > len(s.Refs) {
		t.Errorf("%d fences for %d blocks, %d values for %d", fences, len(s.Blocks), values, len(s.Refs))
	}
	anchors := map[string]bool{}
	once := func(a string) {
		if a != "" && anchors[a] {
			t.Errorf("two things are called #%s", a)
		}
		anchors[a] = true
	}
	for _, step := range s.Steps {
		once(step.Anchor)
		for _, x := range step.Value.Num {
			if !step.Failed && math.IsInf(x, 0) || math.IsNaN(x) && step.Kind != eval.Computed {
				t.Errorf("%s is %v", step.ID, x)
			}
		}
	}
	for _, h := range s.Headings {
		once(h.Anchor)
	}
	for _, r := range s.Remarks {
		once(r.Anchor)
	}
	s.Listing()
}

// Bytes in, bytes out: many compilations of one file, in many orders of maps, are
// the same.
func TestDeterminism(t *testing.T) {
	archive, err := txtar.ParseFile("testdata/json/rows.txtar")
	if err != nil {
		t.Fatal(err)
	}
	root := fstest.MapFS{}
	for _, f := range archive.Files {
		root[f.Name] = &fstest.MapFile{Data: f.Data}
	}
	want := compile(root, "calc.md")
	for range 50 {
		got := compile(root, "calc.md")
		if !bytes.Equal(want.JSON(), got.JSON()) || listing(want) != listing(got) || report(want.Diagnostics) != report(got.Diagnostics) {
			t.Fatal("two compilations differ")
		}
	}
}

// Sizes that a file made to do harm might have are refused by a bound or
// computed, and come to an end.
func TestPathological(t *testing.T) {
	repeat := func(s string, n int) string { return string(bytes.Repeat([]byte(s), n)) }
	bodies := map[string]string{
		"nested brackets in prose": repeat("[", 50_000) + repeat("]", 50_000),
		"links never closed":       repeat("[a](", 50_000),
		"angled links":             repeat("[a](<b", 50_000),
		"titles never closed":      repeat("[a](b (\n", 50_000),
		"emphasis never closed":    repeat("**a *b ", 50_000) + repeat("c_ d__ ", 50_000),
		"nested emphasis":          repeat("*a", 400) + repeat("*", 400),
		"nested quotes":            repeat(">", 50_000),
		"nested lists":             repeat("- ", 50_000) + "a",
		"braces":                   repeat("{", 50_000) + repeat("{a", 50_000),
		"one heading many times":   repeat("# a\n", 20_000),
		"one remark many times":    repeat("> Hold: a\n", 20_000),
		"a wide table":             repeat("|a", 5000) + "\n" + repeat("|-", 5000) + "\n" + repeat("|b\n", 5000),
		"references":               repeat("[a]: b '\n", 20_000),
		"fences":                   repeat("```calc\n", 20_000),
		"brackets in a formula":    "```calc\nx = " + repeat("(", 50_000) + "1" + repeat(")", 50_000) + "\n```\n",
		"calls in a formula":       "```calc\nx = " + repeat("sqrt(", 50_000) + "\n```\n",
		"a long name":              "```calc\n" + repeat("a", 10_000) + " = 1\n```\n",
		"a long sum":               "```calc\nx = 1" + repeat(" + 1", 50_000) + "\n```\n",
		"a long literal":           "```calc\nx = " + repeat("1", 100_000) + "\n```\n",
		"a long power":             "```calc\nx = 2" + repeat("^2", 50_000) + "\n```\n",
		"a chain of checks":        chainOfChecks(10_000),
		"unknown names":            unknownNames(10_000),
		"unknown marks":            "```schedule s\nm | x\n" + numberedLines(10_000, "M%[1]d | %[1]d\n") + "```\n\n```calc\n" + numberedLines(10_000, "a_%[1]d = s.x at \"N%[1]d\"\n") + "```\n",
		"unknown functions":        "```calc\n" + numberedLines(10_000, "f_%[1]d(x) = x\na_%[1]d = g_%[1]d(3)\n") + "```\n",
		"unknown schedules":        numberedLines(10_000, "```schedule s%[1]d\nm | x\nA | 1\n```\n\n```calc\na_%[1]d = t%[1]d.x\n```\n\n"),
		"many helpers":             numberedLines(10_000, "```helper h%[1]d\nx = 1\ny = x\ngives y\n```\n\n"),
		"a table read by its rows": "```schedule s\nm | x\n" + numberedLines(50_000, "M%[1]d | %[1]d\n") + "```\n\n```calc\ny = interpolate(s.x, s.x, s.x)\n```\n",
		"functions that double":    doubling(60),
	}
	many := []string{"nested emphasis", "fences", "one heading many times", "one remark many times", "unknown names", "unknown marks", "unknown functions", "unknown schedules"}
	for name, body := range bodies {
		t.Run(name, func(t *testing.T) {
			s := compile(files("a.md", calc(body)), "a.md")
			if n := len(s.Diagnostics); n > 3 && !slices.Contains(many, name) {
				t.Errorf("%d diagnostics for one mistake", n)
			}
			s.JSON()
			s.PlainText(s.Doc)
		})
	}
}

// chainOfChecks is a value over rows that every line goes on from, with a check of each.
func chainOfChecks(n int) string {
	var b strings.Builder
	b.WriteString("```schedule bolts\nx [mm]\n1\n2\n```\n\n```calc\na_0 = 2*bolts.x\n")
	for i := range n {
		fmt.Fprintf(&b, "a_%d = a_%d + 1 mm\ncheck a_%d <= 1e9 mm\n", i+1, i, i+1)
	}
	return b.String() + "```\n"
}

// unknownNames is a mistake in each line, with a name that others are like.
func unknownNames(n int) string {
	var b strings.Builder
	b.WriteString("```calc\n")
	for i := range n {
		fmt.Fprintf(&b, "a_%d = 2*b_%dx\n", i, i)
	}
	return b.String() + "```\n"
}

// numberedLines is a text n times over with its number in it.
func numberedLines(n int, format string) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, format, i)
	}
	return b.String()
}

// doubling is functions and helpers that each call the one above twice.
func doubling(n int) string {
	var b strings.Builder
	b.WriteString("```helper h_0\nx = 1\ny = x\ngives y\n```\n\n")
	for i := range n {
		fmt.Fprintf(&b, "```helper h_%d\nx = 1\ny = h_%d(x) + h_%d(x)\ngives y\n```\n\n", i+1, i, i)
	}
	b.WriteString("```calc\nf_0(x) = x\n")
	for i := range n {
		fmt.Fprintf(&b, "f_%d(x) = f_%d(x) + f_%d(x)\n", i+1, i, i)
	}
	fmt.Fprintf(&b, "y = f_%d(1)\nz = h_%d(1)\n", n, n)
	return b.String() + "```\n"
}
