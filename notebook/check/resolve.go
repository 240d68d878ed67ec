package check

import (
	"fmt"
	"sort"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// resolve finds what a name stands for and notes the use, or reports why it
// stands for nothing.
func (l *lower) resolve(x *syntax.Name) *Def {
	d := l.e.lookup(x.ID)
	if d == nil && l.site == nil {
		d = l.carried(x)
	}
	if d == nil {
		if !l.failed || !l.carriedFailed(x) {
			l.unknown(x)
		}
		return nil
	}
	d.used = true
	if x.Slot >= 0 && x.Slot < len(l.uses) {
		l.uses[x.Slot] = d
	}
	return d
}

// carried finds `loads.P_u` in the carried file and gives it a place in the
// calc's own scope.
func (l *lower) carried(x *syntax.Name) *Def {
	key, name, dotted := head(x.ID)
	s, ok := l.e.c.spaces[key]
	if !dotted || !ok || s.from == nil {
		return nil
	}
	if s.from.Failed {
		l.depend(s.line)
		return nil
	}
	t, ok := s.from.Values[name]
	if !ok {
		return nil
	}
	c := l.e.c
	d := &Def{ID: x.ID, Symbol: x.Text, Slot: c.prog.Scope.newSlot(), Scope: c.prog.Scope, Type: t, Line: s.line, Carry: s.from, Key: name}
	d.Texts = s.from.Texts[name]
	d.Picked = s.from.Picked[name]
	c.top.names[x.ID] = d
	c.prog.Loads = append(c.prog.Loads, d)
	if t.Kind == Bundle {
		for _, full := range sortedKeys(s.from.Values) {
			if strings.HasPrefix(full, name+".") {
				d.Results = append(d.Results, &Def{ID: key + "." + full})
			}
		}
	}
	return d
}

func (l *lower) carriedFailed(x *syntax.Name) bool {
	key, _, dotted := head(x.ID)
	s, ok := l.e.c.spaces[key]
	return dotted && ok && s.from != nil && s.from.Failed
}

func sortedKeys[V any](m map[string]V) []string {
	keys := make([]string, 0, len(m))
	for k := range m {
		keys = append(keys, k)
	}
	sort.Strings(keys)
	return keys
}

// unknown reports a name that stands for nothing, with the likeliest reason.
func (l *lower) unknown(x *syntax.Name) {
	c := l.e.c
	if space, name, dotted := head(x.ID); dotted {
		l.unknownDotted(x, space, name)
		return
	}
	line, ok := c.later[x.ID]
	ok = ok && l.site == nil
	if ok && l.e.closed() {
		l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s is a value of the calc (line %d), and a helper sees its own parameters and lines only", x.Text, line),
			"make it a parameter of the helper")
		return
	}
	if ok {
		if l.e.c.defining == x.ID {
			l.fail(diag.UsedBefore, x.At, fmt.Sprintf("%s is used in its own definition", x.Text), "a name is defined once, above its first use; give the new value a name of its own")
			return
		}
		l.fail(diag.UsedBefore, x.At, fmt.Sprintf("%s is used here, but defined below, at line %d", x.Text, line), "move its definition above this line")
		return
	}
	if l.e.function(x.ID) != nil || l.e.helper(x.ID) != nil || c.in.Library.has(x.ID) {
		l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s is a function; it has a value only with its arguments", x.Text), fmt.Sprintf("write `%s(…)`", x.Text))
		return
	}
	if b, ok := builtins[x.ID]; ok {
		l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s is a function; it has a value only with its arguments", x.Text), "write `"+b.usage+"`")
		return
	}
	if c.lostCases > 0 && !l.e.closed() { // it may be one of their columns
		l.depend(c.lostCases)
		return
	}
	if s, ok := c.spaces[x.ID]; ok {
		hint := "a value of it is named behind a dot: `" + x.Text + ".…`"
		if s.rows != nil {
			if columns := l.e.inScope(func(d *Def) bool { h, _, _ := head(d.ID); return h == x.ID }); len(columns) > 0 {
				hint = "its columns are " + list(columns)
			}
		}
		l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s is %s, no value", x.Text, s.what), hint)
		return
	}
	near := diag.Nearest(x.ID, l.e.inScope(func(*Def) bool { return true }))
	if units.IsUnitName(x.Text) && !l.inText {
		l.fail(diag.MissingUnit, x.At, fmt.Sprintf("`%s` stands here as a value, but no value of that name is defined; it is a unit", x.Text),
			fmt.Sprintf("a unit stands directly after a number: write `1 %s`", x.Text))
		return
	}
	hint := "a name is defined above its first use: `" + x.Text + " = …`"
	switch {
	case near != "":
		hint = "did you mean `" + near + "`?"
	case l.inText:
		hint = "a calc block defines it; for braces in the text write `\\{" + x.Text + "}`"
	}
	l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s is not defined", x.Text), hint)
}

// unknownDotted reports `bolts.z`, `loads.Q`, `jnt.F_x` that do not exist.
func (l *lower) unknownDotted(x *syntax.Name, space, name string) {
	c := l.e.c
	s, ok := c.spaces[space]
	if ok && s.because > 0 && l.site == nil {
		l.depend(s.because)
		return
	}
	if d := l.e.lookup(space); d != nil {
		switch {
		case d.Failed:
			l.depend(d.Because)
		case d.Type.Kind == Bundle:
			l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s has no result `%s`", d.Symbol, name), "its results are "+list(resultNames(d)))
		default:
			l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s is %s, and has nothing behind a dot", d.Symbol, c.describe(d.Type)))
		}
		return
	}
	if line, ok := c.later[x.ID]; ok && l.site == nil {
		l.fail(diag.UsedBefore, x.At, fmt.Sprintf("%s is used here, but defined below, at line %d", x.Text, line), "move the schedule above this line")
		return
	}
	if !ok || l.site != nil {
		hint := "`a.b` is a schedule's column, a value carried from another calc, or one of a helper's results"
		var spaces []string
		if c.looks.May(len(c.spaces)) {
			spaces = sortedKeys(c.spaces)
		}
		if near := diag.Nearest(space, spaces); near != "" {
			hint = "did you mean `" + near + "." + name + "`?"
		}
		l.fail(diag.UnknownName, x.At, fmt.Sprintf("there is no schedule, carried file or helper's result `%s`", space), hint)
		return
	}
	var known []string
	what := ""
	switch {
	case s.from != nil:
		if c.looks.May(len(s.from.Values)) {
			known = sortedKeys(s.from.Values)
		}
		what = s.from.Path + " defines no value"
	case s.rows != nil:
		for _, id := range l.e.inScope(func(d *Def) bool { h, _, _ := head(d.ID); return h == space }) {
			_, col, _ := head(id)
			known = append(known, col)
		}
		if len(known) == 0 && c.looks.May(0) {
			l.fail(diag.UnknownName, x.At, fmt.Sprintf("the columns of load cases are plain names: %s has no `%s`", space, name), "write `"+name+"`")
			return
		}
		what = "the schedule " + space + " has no column"
	case s.file.Failed:
		l.depend(s.line)
		return
	case s.helpers.named(name) != nil:
		l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s is a helper; it has a value only with its arguments", x.Text),
			"write `"+usage(x.Text, s.helpers.named(name).tree)+"`")
		return
	default:
		for _, h := range s.helpers.order {
			known = append(known, h.tree.Name.ID)
		}
		what = s.file.Path + " has no helper"
	}
	var hints []string
	if near := diag.Nearest(name, known); near != "" {
		hints = []string{"did you mean `" + space + "." + near + "`?"}
	} else if len(known) > 0 {
		hints = []string{"it has " + list(known)}
	}
	l.fail(diag.UnknownName, x.At, fmt.Sprintf("%s `%s`", what, name), hints...)
}

// rowsByName finds the rows that a name stands for behind `over`: a schedule,
// `cases`, or a carried set under its file's key.
func (c *checker) rowsByName(id string) *Rows {
	if s, ok := c.spaces[id]; ok && s.rows != nil {
		return s.rows
	}
	key, name, dotted := head(id)
	if s, ok := c.spaces[key]; dotted && ok && s.from != nil {
		return s.from.Rows[name]
	}
	return nil
}

// functionNames lists what may be called, for a suggestion.
func (e *env) functionNames() []string {
	var out []string
	c := e.c
	for ; e != nil; e = e.parent {
		if !c.looks.May(len(e.funcs) + e.above) {
			return nil
		}
		out = append(out, sortedKeys(e.funcs)...)
		if e.helpers != nil {
			for _, h := range e.helpers.order[:e.above] {
				out = append(out, h.tree.Name.ID)
			}
		}
	}
	return append(out, c.in.Library.Names...)
}
