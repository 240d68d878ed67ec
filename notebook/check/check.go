// Package check finds the dimension and the rows of every expression of a calc
// file before anything is computed, and leaves a tree without units that the
// evaluator turns into numbers. It reports every mistake in one run: what
// failed once is invalid and draws no second message.
//
//	in := &check.Input{Source: src, Blocks: blocks}
//	program := check.Check(in)
//	for _, d := range program.Diagnostics { fmt.Print(d.Text()) }
package check

import (
	"fmt"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// checker holds what is known of one file.
type checker struct {
	in     *Input
	prog   *Program
	top    *env
	consts map[string]*Def
	spaces map[string]*space // names that stand before a dot
	order  map[*Rows]int     // the order in which the file meets its sets of rows
	shared map[[2]*Rows]string
	later  map[string]int // line at which each name of the file is defined first
	// later functions and helpers, for the message that one is not yet defined.
	laterFuncs map[string]int
	block      int
	defining   string   // the name whose definition is being lowered
	plots      []func() // plots and figures, which may use values below them
	depth      int      // nesting of helpers and functions being lowered
	expanding  map[*syntax.Helper]bool
	// caseMarks are the names of columns of marks of load cases. A second set
	// of load cases may head its own by the same word (`case`), and has it
	// under its name then (`wind.case`).
	caseMarks map[string]bool
	lostCases int        // the line of load cases whose columns could not be read, 0 for none
	looks     diag.Looks // at names, for messages
	slabs     slabs
}

// Check checks a file. Its program can be evaluated even where it has errors:
// what failed is marked, with all that depends on it.
func Check(in *Input) *Program {
	c := &checker{
		in:         in,
		consts:     constants(),
		prog:       &Program{In: in, Scope: &Scope{}, CarriedRows: carriedRows(in.Carried), BlockRows: make([]*Rows, len(in.Blocks)), Plots: map[int]*PlotPlan{}, Figures: map[int]*FigurePlan{}},
		spaces:     map[string]*space{},
		order:      map[*Rows]int{},
		shared:     map[[2]*Rows]string{},
		later:      map[string]int{},
		laterFuncs: map[string]int{},
		expanding:  map[*syntax.Helper]bool{},
		caseMarks:  map[string]bool{},
	}
	c.top = &env{c: c, src: in.Source, scope: c.prog.Scope, names: map[string]*Def{}, funcs: map[string]*function{}, helpers: newHelperSet()}
	c.keys()
	c.foresee()
	for i, b := range in.Blocks {
		c.block = i
		c.checkBlock(b)
	}
	for _, p := range c.plots {
		p()
	}
	c.refs()
	c.alike()
	c.notes()
	c.prog.Order = c.ordered()
	diag.Sort(c.prog.Diagnostics)
	return c.prog
}

func (c *checker) report(d diag.Diagnostic) {
	c.prog.Diagnostics = append(c.prog.Diagnostics, d)
}

// keys enters the front matter's keys, which stand before dots.
func (c *checker) keys() {
	for _, f := range c.in.Carried {
		c.spaces[f.Key] = &space{what: "a carried file", line: max(f.Line, 1), from: f}
		c.enterRows(f)
	}
	for _, h := range c.in.Helpers {
		if s, ok := c.spaces[h.Key]; ok {
			c.report(diag.Diagnostic{ID: diag.Redefined, Source: c.in.Source, Message: fmt.Sprintf("`%s` is %s and a helper file", h.Key, s.what), Hints: []string{"give one of them another key"}})
			continue
		}
		c.spaces[h.Key] = &space{what: "a helper file", line: max(h.Line, 1), file: h, helpers: c.helperFile(h)}
	}
}

// enterRows puts the rows of a carried file in order, as the file itself has
// them, so that its values lie here as they lie there.
func (c *checker) enterRows(f *Carry) {
	for _, r := range f.Order {
		if _, ok := c.order[r]; !ok {
			c.order[r] = len(c.order)
		}
	}
}

// ordered lists the sets of rows of the file in order.
func (c *checker) ordered() []*Rows {
	list := make([]*Rows, len(c.order))
	for r, i := range c.order {
		list[i] = r
	}
	return list
}

// foresee notes where each name is defined first, so that a use above it can
// say so.
func (c *checker) foresee() {
	note := func(m map[string]int, n *syntax.Name, prefix string) {
		if n == nil {
			return
		}
		if _, ok := m[prefix+n.ID]; !ok {
			m[prefix+n.ID] = c.in.Source.LineAt(n.At.Start)
		}
	}
	for _, b := range c.in.Blocks {
		for _, s := range b.Stmts {
			switch s := s.(type) {
			case *syntax.Definition:
				if s.Func {
					note(c.laterFuncs, s.Name, "")
				} else {
					note(c.later, s.Name, "")
				}
			case *syntax.BadStmt:
				note(c.later, s.Name, "")
			}
		}
		if b.Helper != nil {
			note(c.laterFuncs, b.Helper.Name, "")
		}
		if t := b.Table; t != nil {
			prefix := ""
			if b.Kind == syntax.ScheduleBlock && t.Name != nil {
				prefix = t.Name.ID + "."
			}
			for i := range t.Columns {
				note(c.later, t.Columns[i].Name, prefix)
			}
		}
	}
}

func (c *checker) laterFunction(id string) (int, bool) {
	line, ok := c.laterFuncs[id]
	return line, ok
}

func (c *checker) checkBlock(b *syntax.Block) {
	switch b.Kind {
	case syntax.CalcBlock:
		body := &body{c: c, e: c.top, block: c.block, plans: make([]*Plan, 0, len(b.Stmts))}
		for _, s := range b.Stmts {
			body.statement(s)
		}
		c.prog.Plans = append(c.prog.Plans, body.plans...)
	case syntax.HelperBlock:
		if b.Helper != nil {
			c.defineHelper(b.Helper)
		}
	case syntax.ScheduleBlock, syntax.CasesBlock:
		if b.Table != nil {
			c.table(b)
		}
	case syntax.PlotBlock:
		if b.Plot != nil {
			block := c.block
			c.plots = append(c.plots, func() { c.plot(block, b.Plot) })
		}
	case syntax.FigureBlock:
		if b.Figure != nil {
			block := c.block
			c.plots = append(c.plots, func() { c.figure(block, b.Figure) })
		}
	}
}

// refs resolves the values named in prose, which may be defined anywhere.
func (c *checker) refs() {
	for i := range c.in.Texts {
		ref := &c.in.Texts[i]
		l := &lower{e: c.top, inText: true}
		plan := RefPlan{}
		n := l.name(ref.Name)
		switch {
		case !n.ok():
		case ref.Unit == nil:
			plan.Def = n.Def
		case n.Type.Kind == Text:
			l.fail(diag.DimensionMismatch, ref.Unit.At, fmt.Sprintf("%s is a text, which has no unit", ref.Name.Text))
		case n.Type.Dim != ref.Unit.Dim || (n.Type.Kind == Point) != ref.Unit.Point:
			l.fail(diag.DimensionMismatch, ref.Unit.At, fmt.Sprintf("%s is %s, but is printed here in %s", ref.Name.Text, c.describe(n.Type), l.unitWords(ref.Unit)),
				"a value in text is printed in another unit of its own dimension")
		case !l.askFreq(ref.Name, n, freqOf(ref.Unit.Unit), fmt.Sprintf("%s is printed here in %s", ref.Name.Text, ref.Unit.Text)).ok():
		default:
			plan.Def, plan.Unit = n.Def, &ref.Unit.Unit
		}
		c.prog.Refs = append(c.prog.Refs, plan)
	}
}

// notes lists the givens without a source and those that nothing uses.
func (c *checker) notes() {
	noted := map[*syntax.Table]bool{}
	for _, p := range c.prog.Plans {
		if !p.IsGiven || p.Def == nil || p.Failed {
			continue
		}
		source, at, shipped := "", p.Def.At, false
		if d, ok := p.Stmt.(*syntax.Definition); ok {
			source = d.Note.Source
		} else if b := c.in.Blocks[p.Block]; b.Table != nil {
			source = b.Note.Source
			if noted[b.Table] {
				source = "noted"
			}
			noted[b.Table] = true
			at = b.Table.At
			_, shipped = c.in.Library.Tables[b.Table.From] // nobody needs all its columns
		}
		if source == "" {
			c.report(diag.Diagnostic{Severity: diag.Note, ID: diag.NoSource, Source: c.in.Source, Span: at,
				Message: fmt.Sprintf("%s is given without a source", givenName(c, p)), Hints: []string{"a source stands in brackets at the end of the note: `# note [source]`"}})
		}
		if !p.Def.used && !shipped && (p.Column == nil || p.Def.Type.Kind != Text) {
			c.report(diag.Diagnostic{Severity: diag.Note, ID: diag.UnusedValue, Source: c.in.Source, Span: p.Def.At,
				Message: fmt.Sprintf("%s is given but not used", p.Def.Symbol)})
		}
	}
}

func givenName(c *checker, p *Plan) string {
	if p.Column != nil {
		b := c.in.Blocks[p.Block]
		if b.Table.Name != nil && b.Kind == syntax.ScheduleBlock {
			return "the schedule " + b.Table.Name.Text
		}
		return "the block of load cases"
	}
	return p.Def.Symbol
}
