package main

import (
	"fmt"
	"slices"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/notebook/library"
	"gusset/notebook/syntax"
	"gusset/units"
)

// TestCallsToCopy pastes the call that is shown for each helper into a calc in
// which its parameters are given, and wants nothing said of it but that a value
// is out of range: the values are all 1.
func TestCallsToCopy(t *testing.T) {
	values := []string{diag.OutOfRange, diag.NotANumber, diag.NoConvergence}
	for _, topic := range library.Load().Topics() {
		for _, e := range topic.Entries {
			text := calcThatCalls(e.Helper)
			fsys := fstest.MapFS{"c.md": {Data: []byte(text)}}
			sheet := notebook.Compile(&notebook.Context{FS: fsys, Panics: true}, "c.md")
			for _, d := range sheet.Diagnostics {
				if d.Severity == diag.Error && !slices.Contains(values, d.ID) {
					t.Errorf("%s: %s\n%s", e.Helper.Name.Text, d.Text(), text)
				}
			}
		}
	}
}

// calcThatCalls gives every required parameter the value 1 in the unit of its
// quantity, and calls the helper as its page shows.
func calcThatCalls(h *syntax.Helper) string {
	var b strings.Builder
	b.WriteString("---\ncalc: C-1\n---\n\n")
	var columns, cells []string
	givens := ""
	call := helperCall(h)
	for _, p := range h.Params {
		unit := ""
		if p.Unit != nil {
			unit = p.Unit.Unit.String()
			if p.Unit.Quantity != "" {
				unit = (units.Printing{}).UnitFor(p.Unit.Dim, p.Unit.Point).String()
			}
		}
		switch {
		case p.Default != nil:
		case p.Unit != nil && p.Unit.Column:
			head := p.Name.Text
			if unit != "" {
				head += " [" + unit + "]"
			}
			columns, cells = append(columns, head), append(cells, "1")
			call = strings.Replace(call, p.Name.Text+",", "rows."+p.Name.Text+",", 1)
			call = strings.Replace(call, p.Name.Text+")", "rows."+p.Name.Text+")", 1)
		default:
			givens += fmt.Sprintf("%s = 1 %s\n", p.Name.Text, unit)
		}
	}
	if columns != nil {
		fmt.Fprintf(&b, "```schedule rows\nmark | %s\n1 | %s\n2 | %s\n```\n\n", strings.Join(columns, " | "), strings.Join(cells, " | "), strings.Join(cells, " | "))
	}
	fmt.Fprintf(&b, "```calc\n%s%s\n```\n", givens, call)
	return b.String()
}

// TestHelperPagesShowEverything wants every parameter, limit, formula and result
// of every helper on its page.
func TestHelperPagesShowEverything(t *testing.T) {
	for _, topic := range library.Load().Topics() {
		for _, e := range topic.Entries {
			page := helperPage(e, false)
			h := e.Helper
			for _, p := range h.Params {
				if !strings.Contains(page, "\n   "+p.Name.Text+declared(p.Unit)) {
					t.Errorf("%s: the parameter %s is missing", h.Name.Text, p.Name.Text)
				}
			}
			for _, s := range h.Stmts {
				switch s := s.(type) {
				case *syntax.Needs:
					if !strings.Contains(page, "\n   "+syntax.Print(h.Source, s.Cond)) {
						t.Errorf("%s: the limit %s is missing", h.Name.Text, syntax.Print(h.Source, s.Cond))
					}
				case *syntax.Definition:
					for _, b := range s.Branches {
						if !strings.Contains(page, " = "+syntax.Print(h.Source, b.Value)) {
							t.Errorf("%s: a formula of %s is missing", h.Name.Text, s.Name.Text)
						}
					}
				}
			}
			_, results, _ := strings.Cut(page, "\nResults\n")
			for _, name := range h.Gives {
				if !strings.Contains(results, name.Text) {
					t.Errorf("%s: the result %s is missing", h.Name.Text, name.Text)
				}
			}
		}
	}
}
