package notebook

import (
	"fmt"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/yuin/goldmark/ast"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// errorsOf lists errors and warnings, one a line, without the excerpts.
func errorsOf(s *Sheet) string {
	var b strings.Builder
	for _, d := range s.Diagnostics {
		if d.Severity != diag.Note {
			line, column := d.Source.Position(d.Span.Start)
			fmt.Fprintf(&b, "%d:%d %s %s\n", line, column, d.ID, d.Message)
		}
	}
	return b.String()
}

func TestHeadings(t *testing.T) {
	tests := []struct{ name, body, want string }{
		{"from level two", "## A\n### B\n### C\n## D\n### E\n", "1 A 1\n1.1 B 2\n1.2 C 2\n2 D 1\n2.1 E 2\n"},
		{"a level left out", "# A\n### B\n## C\n# D\n", "1 A 1\n1.1 B 2\n1.2 C 2\n2 D 1\n"},
		{"deeper first", "### A\n## B\n### C\n", "1 A 1\n2 B 1\n2.1 C 2\n"},
		{"underlined", "A\n=\n\nB\n-\n", "1 A 1\n1.1 B 2\n"},
		{"marked text", "# A *b* `c {d}` [e](https://example.org) &amp; \\{f} <g>\n", "1 A b c {d} e & {f} <g> 1\n"},
		{"within a quote", "# A\n\n> ## B\n\n# C\n", "1 A 1\n B 2\n2 C 1\n"},
	}
	for _, tt := range tests {
		s := compile(files("a.md", calc(tt.body)), "a.md")
		var b strings.Builder
		for _, h := range s.Headings {
			fmt.Fprintf(&b, "%s %s %d\n", h.Number, h.Text, h.Level)
			if s.HeadingOf(h.Node) != h {
				t.Errorf("%s: HeadingOf does not find %s", tt.name, h.Text)
			}
		}
		if d := cmp.Diff(tt.want, b.String()); d != "" {
			t.Errorf("%s: %s", tt.name, d)
		}
	}
}

// The anchor of a heading stays when the figures in it change, and no two are alike.
func TestAnchors(t *testing.T) {
	s := compile(files("a.md", calc("# Pin, {d}\n# Pin d\n# v-d\n# …\n# Über 2\n\n```calc\nd = 25 mm\n```\n")), "a.md")
	var got []string
	for _, h := range s.Headings {
		got = append(got, h.Anchor)
	}
	if d := cmp.Diff([]string{"pin-d", "pin-d-2", "v-d-2", "section", "über-2"}, got); d != "" {
		t.Error(d)
	}
}

func TestRemarks(t *testing.T) {
	tests := []struct{ name, body, want string }{
		{"plain", "> Assumption: Plates are snug.\n", "A1 Assumption: Plates are snug.\n"},
		{"marked", "> **Hold:** Site survey.\n\n> *Hold*: Steel grade.\n\n> ***Hold:***\n> Bolts.\n", "H1 Hold: Site survey.\nH2 Hold: Steel grade.\nH3 Hold: Bolts.\n"},
		{"all kinds", "> Note: a\n\n> Caution: b\n\n> Assumption: c\n\n> Hold: d\n", " Note: a\n Caution: b\nA1 Assumption: c\nH1 Hold: d\n"},
		{"code", "> Assumption: a\n>\n> ```\n> b = 1\n> ```\n> c\n", "A1 Assumption: a b = 1 c\n"},
		{"paragraphs", "> Assumption: a *b*\n> c\n>\n> d\n", "A1 Assumption: a b c d\n"},
		{"one below the other", "> Assumption: a\n> Assumption: b\n> c\n> **Hold:** d\n>\n> e\n>\n> Hold: f\n", "A1 Assumption: a\nA2 Assumption: b c\nH1 Hold: d e\nH2 Hold: f\n"},
		{"in a list", "- x\n\n  > Hold: a\n", "H1 Hold: a\n"},
		{"in a quote", "> Caution: a\n>\n> > Hold: b\n", " Caution: a b\nH1 Hold: b\n"},
		{"other quotes", "> Assumptions: a\n\n> assumption: b\n\n> Hold on\n\n> Hold : c\n\n> a\n>\n> Hold: d\n\n> *Hold* it\n\n> `Hold:` e\n", ""},
	}
	for _, tt := range tests {
		s := compile(files("a.md", calc(tt.body)), "a.md")
		var b strings.Builder
		for _, r := range s.Remarks {
			fmt.Fprintf(&b, "%s %s: %s\n", r.Number, r.Kind, r.Text)
			if s.RemarkOf(r.Node) != r || r.Node.Kind() != ast.KindBlockquote {
				t.Errorf("%s: RemarkOf does not find %s", tt.name, r.Text)
			}
		}
		if d := cmp.Diff(tt.want, b.String()); d != "" {
			t.Errorf("%s: %s", tt.name, d)
		}
	}
}

// Lines of fences keep their places in the file, wherever the fence stands.
func TestFencePlaces(t *testing.T) {
	bodies := []string{
		"```calc\nd = 25 mm # Pin\n```\n",
		"~~~~calc brief\nd = 25 mm # Pin\n~~~~\n",
		"- item\n\n  ```calc\n  d = 25 mm # Pin\n  ```\n",
		"1. item\n   - item\n\n     ```calc\n     d = 25 mm # Pin\n     ```\n",
		"> quote\n>\n> ```calc\n> d = 25 mm # Pin\n> ```\n",
		"> - item\n>\n>   ```calc\n>   d = 25 mm # Pin\n>   ```\n",
		"-\titem\n\n\t```calc\n\td = 25 mm # Pin\n\t```\n",
		"   ``` calc\n   d = 25 mm # Pin\n   ```\n",
	}
	for _, body := range bodies {
		for _, end := range []string{"\n", "\r\n"} {
			for _, mark := range []string{"", "\ufeff"} {
				text := mark + strings.ReplaceAll(calc(body), "\n", end)
				s := compile(files("a.md", text), "a.md")
				if got := errorsOf(s); got != "" || len(s.Blocks) != 1 || len(s.Blocks[0].Tree.Stmts) != 1 {
					t.Fatalf("%q: %s", text, got)
				}
				def := s.Blocks[0].Tree.Stmts[0].(*syntax.Definition)
				if got := s.Source.Slice(def.At); !strings.HasPrefix(got, "d = 25 mm") {
					t.Errorf("%q: the statement is at %q", text, got)
				}
				if got := s.Source.Slice(s.Blocks[0].Tree.At); !strings.HasSuffix(got, "```") && !strings.HasSuffix(got, "~~~~") {
					t.Errorf("%q: the fence is at %q", text, got)
				}
			}
		}
	}
}

// Values in text are found in every place that holds text, and nowhere else.
func TestValuesInText(t *testing.T) {
	tests := []struct{ body, want string }{
		{"{d} and {d [m]}, **{d}**_{d}_ x{d}y", "d d [m] d d d"},
		{"# {d}\n\n- {d}\n\n> {d}\n\n| {d} | a |\n|---|---|\n| b | {d [in]} \\| {d} |\n", "d d d d d [in] d"},
		{"[{d}](https://example.org/{d}) ![{d}]({d}.png)", "d d"},
		{"`{d}` \\{d} {d e} {} { } {1} {d[} {d [m} {{d}} {d\n}\n\n    {d}\n\n```text\n{d}\n```\n", "d"},
		{"{ d }{d [m] }{\td\t[ m ]}", "d d [m] d [m]"},
		{"{τ_d} {bolts.x} {jnt.F_v [kN]} {d'}", "tau_d bolts.x jnt.F_v [kN] d'"},
		{"{if} {over}", ""},
	}
	for _, tt := range tests {
		d := Read(&Context{FS: files("a.md", calc(tt.body)), Panics: true}, "a.md")
		var got []string
		for _, r := range d.texts {
			word := r.Name.ID
			if r.Unit != nil {
				word += " [" + r.Unit.Text + "]"
			}
			if text := d.source.Slice(r.At); text[0] != '{' || text[len(text)-1] != '}' {
				t.Errorf("%q: the value is at %q", tt.body, text)
			}
			got = append(got, word)
		}
		if d := cmp.Diff(tt.want, strings.Join(got, " ")); d != "" {
			t.Errorf("%q: %s", tt.body, d)
		}
		found := 0
		for n := range nodes(d.doc) {
			if v, ok := n.(*ValueNode); ok {
				if v.Index != found {
					t.Errorf("%q: value %d stands where %d should", tt.body, v.Index, found)
				}
				found++
			}
		}
		if found != len(d.texts) {
			t.Errorf("%q: %d of %d values are in the tree", tt.body, found, len(d.texts))
		}
	}
}

// Raw HTML is text, and a dropped link leaves its text.
func TestTextIsKept(t *testing.T) {
	tests := []struct{ body, want string }{
		{"a <b>c</b> <!-- d -->", "a <b>c</b> <!-- d -->"},
		{"<script>\nalert(1)\n</script>", "<script> alert(1) </script>"},
		{"a [*b* `c`](javascript:x) d <javascript:y&z>", "a b c d javascript:y&z"},
		{"![a *b*](https://example.org/x.png) ![c](x.png)", "a b c"},
		{"a\\\nb  \nc &lt;d&gt; &#65;\\&amp;", "a b c <d> A&amp;"},
	}
	for _, tt := range tests {
		s := compile(files("a.md", calc(tt.body)), "a.md")
		if got := s.PlainText(s.Doc); got != tt.want {
			t.Errorf("%q: got %q, want %q", tt.body, got, tt.want)
		}
	}
}

// Good links are kept as a page can print them.
func TestLinksKept(t *testing.T) {
	body := "[a](https://example.org/a b?c=1&d=\"e\") [b](<x y.md>) [c](#pin) [d](mailto:a@example.org) [e](a&amp;b) [f](HTTP://example.org)"
	s := compile(files("a.md", calc(strings.Replace(body, "a b?", "a%20b?", 1))), "a.md")
	var got []string
	for n := range nodes(s.Doc) {
		if l, ok := n.(*ast.Link); ok {
			got = append(got, string(l.Destination))
		}
	}
	want := []string{`https://example.org/a%20b?c=1&d=%22e%22`, "x%20y.md", "#pin", "mailto:a@example.org", "a&b", "HTTP://example.org"}
	if d := cmp.Diff(want, got); d != "" {
		t.Error(d)
	}
}
