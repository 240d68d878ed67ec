package render

import (
	"slices"
	"strconv"

	"gusset/notebook"
	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render/maths"
)

// block makes the entries of a fence.
func (c *composer) block(b *notebook.Block) []Entry {
	switch b.Kind {
	case syntax.HelperBlock:
		return c.helperBlock(b)
	case syntax.ScheduleBlock, syntax.CasesBlock:
		return []Entry{c.schedule(b)}
	case syntax.PlotBlock, syntax.FigureBlock:
		return []Entry{{
			Kind: DrawingOf, Anchor: b.Anchor, Refs: sources(b.Source),
			Drawing: drawing(b),
		}}
	}
	return c.steps(make([]Entry, 0, len(b.Steps)), b.Steps, 0, b.Full)
}

// steps appends the entries of lines. Values in a sequence over the same rows
// are followed by one table of all their entries.
func (c *composer) steps(entries []Entry, steps []*eval.Step, indent int, full bool) []Entry {
	var group []*eval.Step // the values whose table is yet to come
	flush := func() {
		for len(group) > 0 {
			n := min(len(group), maxColumns)
			entries = append(entries, Entry{Kind: Tabular, Indent: indent, Tables: []*Table{c.valueTable(group[:n], full)}})
			group = group[n:]
		}
	}
	for _, s := range steps {
		if s.Failed || s.Kind == eval.Constant {
			continue
		}
		if s.Kind != eval.Gap && len(group) > 0 && !(hasRows(s) && slices.Equal(group[0].Value.Type.Rows, s.Value.Type.Rows)) {
			flush()
		}
		entries = c.step(entries, s, indent, full)
		if hasRows(s) {
			group = append(group, s)
		}
		for _, r := range s.Results {
			if len(group) > 0 && !(hasRows(r) && slices.Equal(group[0].Value.Type.Rows, r.Value.Type.Rows)) {
				flush()
			}
			if hasRows(r) {
				group = append(group, r)
			}
		}
	}
	flush()
	return entries
}

// hasRows tells whether a step is a value with an entry for each of some rows.
func hasRows(s *eval.Step) bool {
	return s.Check == nil && len(s.Value.Type.Rows) > 0 && s.Value.Type.Kind != check.Bundle
}

// step appends the entries of one line: its own, and those of the helpers that
// it calls.
func (c *composer) step(entries []Entry, s *eval.Step, indent int, full bool) []Entry {
	for _, call := range s.Calls {
		c.place(call)
	}
	entries = append(entries, Entry{Indent: indent})
	e := &entries[len(entries)-1]
	if s.Kind == eval.Gap {
		e.Kind = Gap
		return entries
	}
	e.Anchor, e.Number, e.Refs, e.Note = c.maths.Anchor(s), s.Number, sources(s.Source), s.Note
	switch s.Kind {
	case eval.NoteLine:
		e.Kind = NoteLine
		return entries
	case eval.Given:
		e.Kind = Line
		e.Formula = maths.Chain{Left: c.maths.Plain(s), Steps: equal(c.maths.Output(s, s.Entry))}
		return entries
	case eval.Carried:
		c.carried(s, e)
		return entries
	case eval.Function:
		c.function(s, e)
		return entries
	case eval.Check:
		c.check(s, e, full)
	case eval.Limit:
		c.limit(s, e)
	default:
		c.computed(s, e)
	}
	if !s.Brief {
		for _, call := range s.Calls {
			entries = c.call(entries, call, indent+1)
		}
	}
	for _, r := range s.Results {
		entries = append(entries, c.result(r, indent))
	}
	return entries
}

func sources(source string) []Ref {
	if source == "" {
		return nil
	}
	return []Ref{{Text: source}}
}

func equal(n maths.Node) []maths.Step { return []maths.Step{{Sign: "=", Right: n}} }

// carried is a line whose right side is only another calc's value.
func (c *composer) carried(s *eval.Step, e *Entry) {
	e.Kind = Line
	e.Formula = maths.Chain{Left: c.maths.Plain(s), Steps: equal(c.maths.Written(s))}
	e.Formula.Steps = append(e.Formula.Steps, equal(c.maths.Output(s, s.Entry))...)
	if s.Origin != nil {
		e.Refs = append([]Ref{{Text: maths.Origin(s.Origin)}}, e.Refs...)
	}
	e.Mark = s.Value.Type.Mark(s.Entry)
}

// function is the definition of a function of the author's own.
func (c *composer) function(s *eval.Step, e *Entry) {
	e.Kind = Definition
	c.maths.Define(s)
	d := s.Stmt.(*syntax.Definition)
	e.Formula = maths.Chain{Left: c.signature(d.Name, d.Params), Steps: equal(c.maths.Function(d, s))}
	e.Below = c.whereUnits(d, d.Unit)
}

// signature is a function's name with its parameters.
func (c *composer) signature(name *syntax.Name, params []*syntax.Name) maths.Node {
	args := make([]maths.Node, len(params))
	for i, p := range params {
		args[i] = c.maths.Name(p.Text)
	}
	return maths.Call(c.maths.Name(name.Text), args...)
}

// computed is a value with its formula as written, the values put in, and the
// outcome in the output column.
func (c *composer) computed(s *eval.Step, e *Entry) {
	bundle := s.Value.Type.Kind == check.Bundle || len(s.Results) > 0
	if !bundle {
		e.Output = c.maths.Output(s, s.Entry)
		e.Mark = s.Value.Type.Mark(s.Entry)
	}
	e.Formula.Left = c.maths.Plain(s)
	d, ok := s.Stmt.(*syntax.Definition)
	if s.Brief || !ok {
		e.Kind = Line
		return
	}
	e.Kind = Formula
	if d.Func {
		e.Formula.Left = c.signature(d.Name, d.Params)
	}
	e.Formula.Steps = append(make([]maths.Step, 0, 2), maths.Step{Sign: "=", Right: c.maths.Written(s)})
	for _, t := range s.Trials {
		tried := t.Value
		if s.Value.Type.Kind != check.Text {
			tried = typeset(tried)
		}
		e.Trials = append(e.Trials, Trial{Value: tried, Mark: t.Mark, Why: typeset(t.Why), OK: t.OK})
	}
	if bundle || len(d.Branches) == 0 {
		return
	}
	value := d.Branches[maths.Taken(s, s.Entry)].Value
	if !wholeCall(value, s) && len(s.Trials) == 0 {
		put := c.maths.Put(value, s, s.Value.Type, s.Entry)
		if put != nil && !same(put, e.Output) {
			e.Formula.Steps = append(e.Formula.Steps, maths.Step{Sign: "=", Right: put})
		}
	}
	if len(d.Branches) > 1 || d.Branches[0].Cond != nil {
		if p, ok := c.decidedBy(d, s); ok {
			e.Below = append(e.Below, p)
		}
	}
	e.Below = append(e.Below, c.whereUnits(d, d.Unit)...)
	e.Refs = append(e.Refs, carriedFrom(s)...)
}

// same tells whether two nodes are one value, printed alike.
func same(a, b maths.Node) bool {
	switch a := a.(type) {
	case maths.Number:
		b, ok := b.(maths.Number)
		return ok && slices.Equal(a.Unit, b.Unit) && sameFigures(a.Value, b.Value)
	case maths.Text:
		b, ok := b.(maths.Text)
		return ok && a.Text == b.Text
	case maths.Row:
		b, ok := b.(maths.Row)
		return ok && slices.EqualFunc(a, b, same)
	case maths.Space:
		b, ok := b.(maths.Space)
		return ok && a == b
	}
	return false
}

// sameFigures tells whether figures stand for one number: 48 and 48.00 do.
func sameFigures(a, b string) bool {
	if a == b {
		return true
	}
	x, errX := strconv.ParseFloat(a, 64)
	y, errY := strconv.ParseFloat(b, 64)
	return errX == nil && errY == nil && x == y
}

// wholeCall tells whether an expression is the call of a helper and nothing
// else: its value is the output.
func wholeCall(e syntax.Expr, s *eval.Step) bool {
	for {
		switch x := e.(type) {
		case *syntax.Paren:
			e = x.X
			continue
		case *syntax.Call:
			for _, call := range s.Calls {
				if call.Expr == x {
					return true
				}
			}
		}
		return false
	}
}

// decidedBy gives the values that the conditions of a choice look at.
func (c *composer) decidedBy(d *syntax.Definition, s *eval.Step) (Phrase, bool) {
	var row maths.Row
	seen := map[*eval.Step]bool{}
	for _, b := range d.Branches {
		syntaxNames(b.Cond, func(n *syntax.Name) {
			if n.Slot < 0 || n.Slot >= len(s.Uses) {
				return
			}
			used := s.Uses[n.Slot]
			if used == nil || seen[used] || used.Value.Len() == 0 {
				return
			}
			entry := s.Value.Type.Project(s.Entry, used.Value.Type)
			if entry < 0 {
				return
			}
			seen[used] = true
			if len(row) > 0 {
				row = append(row, maths.Comma)
			}
			row = append(row, maths.Pair(c.maths.Plain(used), c.maths.Value(used, entry)))
		})
	}
	return Phrase{Before: "with", Formula: maths.Chain{Left: row}}, len(row) > 0
}

// whereUnits tells the units that an empirical rule takes its values in, and
// the unit it gives.
func (c *composer) whereUnits(d *syntax.Definition, unit *syntax.UnitRef) []Phrase {
	if len(d.Where) == 0 {
		return nil
	}
	var row maths.Row
	add := func(n *syntax.Name, u *syntax.UnitRef) {
		if u == nil || u.Quantity == "number" {
			return
		}
		if len(row) > 0 {
			row = append(row, maths.Comma)
		}
		row = append(row, c.maths.Name(n.Text), maths.Blank, maths.Text{Text: "in"}, maths.Blank, c.maths.Unit(u.Unit))
	}
	for _, w := range d.Where {
		add(w.Name, w.Unit)
	}
	add(d.Name, unit)
	return []Phrase{{Before: "with", Formula: maths.Chain{Left: row}}}
}

// carriedFrom names the calcs whose values stand in a formula.
func carriedFrom(s *eval.Step) []Ref {
	var refs []Ref
	for i, u := range s.Uses {
		if u == nil || !maths.IsCarried(u) || repeated(s.Uses[:i], u) {
			continue
		}
		refs = append(refs, Ref{Text: maths.CarriedMark + " " + maths.Origin(u.Origin)})
	}
	return refs
}

// repeated tells whether another value of the same calc came before.
func repeated(before []*eval.Step, u *eval.Step) bool {
	for _, b := range before {
		if b != nil && maths.IsCarried(b) && b.Origin.Key == u.Origin.Key {
			return true
		}
	}
	return false
}

// result is one of several results of a helper.
func (c *composer) result(r *eval.Step, indent int) Entry {
	return Entry{
		Kind: Line, Indent: indent, Anchor: r.Anchor, Number: r.Number, Note: r.Note,
		Formula: maths.Chain{Left: c.maths.Plain(r)},
		Output:  c.maths.Output(r, r.Entry), Mark: r.Value.Type.Mark(r.Entry),
	}
}

// syntaxNames visits the names of an expression in order.
func syntaxNames(e syntax.Expr, visit func(*syntax.Name)) {
	switch e := e.(type) {
	case *syntax.Name:
		visit(e)
	case *syntax.Paren:
		syntaxNames(e.X, visit)
	case *syntax.Unary:
		syntaxNames(e.X, visit)
	case *syntax.Binary:
		syntaxNames(e.X, visit)
		syntaxNames(e.Y, visit)
	case *syntax.Compare:
		for _, x := range e.Operands {
			syntaxNames(x, visit)
		}
	case *syntax.AtMark:
		syntaxNames(e.X, visit)
		syntaxNames(e.Y, visit)
	case *syntax.Call:
		for _, a := range e.Args {
			syntaxNames(a.Value, visit)
		}
	}
}
