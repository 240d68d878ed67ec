package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"gusset/notebook/diag"
	"gusset/notebook/library"
	"gusset/notebook/syntax"
)

func helpersCommand(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "helpers [NAME]",
		Short: "List the helpers that ship with the program, or show one",
		Long: `helpers lists the small calculations that a calc file may call, by topic. With a name it
shows one: parameters with their units, limits of validity, formulas, source, results, and
a call to copy.`,
		Example: "  gusset helpers\n  gusset helpers direct_shear",
		Args:    between(0, 1, "the name of one helper, or none for the list"),
		ValidArgsFunction: func(_ *cobra.Command, args []string, _ string) ([]string, cobra.ShellCompDirective) {
			if len(args) > 0 {
				return nil, cobra.ShellCompDirectiveNoFileComp
			}
			return helperNames(), cobra.ShellCompDirectiveNoFileComp
		},
		RunE: func(_ *cobra.Command, args []string) error {
			text := ""
			if len(args) == 0 {
				text = helperList(t.colour)
			} else {
				entry, err := findHelper(args[0])
				if err != nil {
					return err
				}
				text = helperPage(entry, t.colour)
			}
			_, err := io.WriteString(t.out, text)
			return err
		},
	}
}

func helperNames() []string {
	var names []string
	for _, topic := range library.Load().Topics() {
		for _, e := range topic.Entries {
			names = append(names, e.Helper.Name.Text)
		}
	}
	return names
}

func findHelper(name string) (library.Entry, error) {
	for _, topic := range library.Load().Topics() {
		for _, e := range topic.Entries {
			if e.Helper.Name.ID == syntax.Canonical(name) {
				return e, nil
			}
		}
	}
	if near := diag.Nearest(name, helperNames()); near != "" {
		return library.Entry{}, fmt.Errorf("there is no helper `%s`; did you mean `%s`?", name, near)
	}
	var like []string
	for _, n := range helperNames() {
		if strings.Contains(n, strings.ToLower(name)) {
			like = append(like, n)
		}
	}
	if len(like) > 0 {
		return library.Entry{}, fmt.Errorf("there is no helper `%s`; with this in their names: %s", name, strings.Join(like, ", "))
	}
	return library.Entry{}, fmt.Errorf("there is no helper `%s`; `gusset helpers` lists them", name)
}

// helperList is one line for each helper under its topic.
func helperList(colour style) string {
	var name column
	for _, n := range helperNames() {
		name.fit(n, leftWidth)
	}
	var b strings.Builder
	for i, topic := range library.Load().Topics() {
		if i > 0 {
			b.WriteByte('\n')
		}
		b.WriteString(colour.paint(bold, topic.Title) + "\n")
		for _, e := range topic.Entries {
			b.WriteString("   " + name.pad(e.Helper.Name.Text) + "  " + e.Helper.Note.Text + "\n")
		}
	}
	b.WriteString("\n`gusset helpers NAME` shows one\n")
	return b.String()
}

// helperPage shows one helper.
func helperPage(e library.Entry, colour style) string {
	h := e.Helper
	p := pageOf(h)
	var b strings.Builder
	b.WriteString(colour.paint(bold, h.Name.Text) + "  " + h.Note.Text + "\n")
	if h.Note.Source != "" {
		b.WriteString("[" + h.Note.Source + "]\n")
	}
	if e.About != "" {
		b.WriteString("\n" + e.About + "\n")
	}
	for _, r := range p.remarks {
		b.WriteString("\n" + r + "\n")
	}
	for _, s := range []section{p.parameters, p.limits, p.formulas, p.results} {
		if len(s.lines) == 0 {
			continue
		}
		b.WriteString("\n" + colour.paint(bold, s.title) + "\n")
		var left column
		for _, l := range s.lines {
			left.fit(l[0], 2*leftWidth)
		}
		for _, l := range s.lines {
			b.WriteString("   " + strings.TrimRight(left.pad(l[0])+"  "+l[1], " ") + "\n")
		}
	}
	b.WriteString("\n" + colour.paint(bold, "Call") + "\n")
	b.WriteString("   " + helperCall(h) + "\n")
	return b.String()
}

// section is a part of a helper's page: lines of a text and what is said of it.
type section struct {
	title string
	lines [][2]string
}

func (s *section) add(text string, note syntax.Note) {
	if note.Source != "" {
		note.Text = strings.TrimSpace(note.Text + " [" + note.Source + "]")
	}
	s.lines = append(s.lines, [2]string{text, note.Text})
}

type helperParts struct {
	parameters, limits, formulas, results section
	remarks                               []string
}

// pageOf sorts a helper's lines into the parts of its page.
func pageOf(h *syntax.Helper) helperParts {
	p := helperParts{
		parameters: section{title: "Parameters"}, limits: section{title: "Limits"},
		formulas: section{title: "Formulas"}, results: section{title: "Results"},
	}
	said := map[string]syntax.Note{}
	units := map[string]string{}
	for _, param := range h.Params {
		text := param.Name.Text + declared(param.Unit)
		if param.Default != nil {
			text += " = " + syntax.Print(h.Source, param.Default)
		}
		p.parameters.add(text, param.Note)
		said[param.Name.ID], units[param.Name.ID] = param.Note, declared(param.Unit)
	}
	for _, s := range h.Stmts {
		switch s := s.(type) {
		case *syntax.Needs:
			text := syntax.Print(h.Source, s.Cond)
			if s.Warn {
				text += ", else a warning"
			}
			p.limits.add(text, s.Note)
		case *syntax.Definition:
			p.define(h, s)
			said[s.Name.ID], units[s.Name.ID] = s.Note, declared(s.Unit)
		case *syntax.NoteLine:
			p.remarks = append(p.remarks, strings.TrimSpace(s.Note.Text+" "+bracketed(s.Note.Source)))
		}
	}
	for _, name := range h.Gives {
		text := name.Text + units[name.ID]
		if len(h.Gives) > 1 {
			text = resultName + "." + text
		}
		p.results.add(text, syntax.Note{Text: said[name.ID].Text})
	}
	return p
}

// define adds the lines of a definition, one for each branch.
func (p *helperParts) define(h *syntax.Helper, d *syntax.Definition) {
	left := d.Name.Text + declared(d.Unit)
	if d.Func {
		var params []string
		for _, name := range d.Params {
			params = append(params, name.Text)
		}
		left = d.Name.Text + "(" + strings.Join(params, ", ") + ")" + declared(d.Unit)
	}
	for i, branch := range d.Branches {
		text := left + " = " + syntax.Print(h.Source, branch.Value)
		if i > 0 {
			text = strings.Repeat(" ", diag.Width(left)) + " = " + syntax.Print(h.Source, branch.Value)
		}
		switch {
		case branch.Otherwise:
			text += "   otherwise"
		case branch.Cond != nil:
			text += "   if " + syntax.Print(h.Source, branch.Cond)
		}
		note := branch.Note
		if i == 0 && note.Text == "" {
			note = d.Note
		}
		p.formulas.add(text, note)
	}
	if len(d.Where) > 0 {
		var items []string
		for _, w := range d.Where {
			items = append(items, w.Name.Text+declared(w.Unit))
		}
		p.formulas.add(strings.Repeat(" ", diag.Width(left))+"   where "+strings.Join(items, ", "), syntax.Note{})
	}
}

func declared(u *syntax.UnitRef) string {
	if u == nil {
		return ""
	}
	return " [" + u.Text + "]"
}

func bracketed(source string) string {
	if source == "" {
		return ""
	}
	return "[" + source + "]"
}

// resultName is what a call is called whose results are several.
const resultName = "res"

// helperCall is a call to copy: required arguments by position under the
// helper's own names, the others by name with their defaults.
func helperCall(h *syntax.Helper) string {
	name := resultName
	if len(h.Gives) == 1 {
		name = h.Gives[0].Text
	}
	var args []string
	for _, p := range h.Params {
		arg := p.Name.Text
		if p.Default != nil {
			arg += "=" + syntax.Print(h.Source, p.Default)
		}
		args = append(args, arg)
	}
	return name + " = " + h.Name.Text + "(" + strings.Join(args, ", ") + ")"
}
