package render

import (
	"strconv"

	"gusset/notebook"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render/maths"
)

// place gives the lines of a helper as it was called their places on the page.
func (c *composer) place(call *eval.Call) {
	c.calls++
	at := "h" + strconv.Itoa(c.calls) + "."
	given := at + "given"
	if call.Helper == nil && len(call.Steps) > 0 { // a function has no head
		given = at + call.Steps[0].ID
	}
	for _, a := range call.Args {
		c.maths.Place(a, given)
	}
	for _, s := range call.Steps {
		if s.ID != "" {
			c.maths.Place(s, at+s.ID)
		}
	}
}

// call appends the lines of a helper as it was called: its title, its source and
// the values that it was given, then its own formulas and limits.
func (c *composer) call(dst []Entry, call *eval.Call, indent int) []Entry {
	h := call.Helper
	if h == nil { // a function of the author's own: its formula with the caller's values
		return c.steps(dst, call.Steps, indent, false)
	}
	head := Entry{Kind: HelperHead, Indent: indent, Note: helperTitle(h), Refs: sources(h.Note.Source), Mark: call.Mark}
	if len(call.Args) > 0 {
		head.Anchor = c.maths.Anchor(call.Args[0])
	}
	for _, text := range call.Cautions {
		if line := c.caution(text); line != nil {
			head.Refs = append(head.Refs, Ref{Text: "caution " + line.Number, Target: line.Anchor})
		}
	}
	head.Formula.Left = c.arguments(call.Args)
	return c.steps(append(dst, head), call.Steps, indent, false)
}

// helperTitle is a helper's title, else its name.
func helperTitle(h *syntax.Helper) string {
	if h.Note.Text != "" {
		return h.Note.Text
	}
	return h.Name.Text
}

// arguments sets parameters with the values they took, side by side.
func (c *composer) arguments(args []*eval.Step) maths.Node {
	var row maths.Row
	for _, a := range args {
		if len(row) > 0 {
			row = append(row, maths.Comma)
		}
		if len(a.Value.Type.Rows) > 0 {
			row = append(row, c.maths.Plain(a), maths.Relation("="), c.column(a))
		} else {
			row = append(row, maths.Pair(c.maths.Plain(a), c.maths.Output(a, 0)))
		}
	}
	if row == nil {
		return nil
	}
	return row
}

// column sets the entries of a column in brackets: all of a few, else the first
// and the last.
func (c *composer) column(a *eval.Step) maths.Node {
	const all = 8
	var row maths.Row
	n := a.Value.Len()
	for i := range n {
		if n > all && i >= all-2 && i < n-1 {
			if i == all-2 {
				row = append(row, maths.Comma, maths.Text{Text: "…"})
			}
			continue
		}
		if i > 0 {
			row = append(row, maths.Comma)
		}
		row = append(row, c.maths.Output(a, i))
	}
	return maths.Paren(row)
}

// blockAnchor is where a block stands on the page; a helper's has a dot, so that
// no heading has the same.
func blockAnchor(b *notebook.Block) string {
	if b.Kind == syntax.HelperBlock {
		return "helper." + b.Name
	}
	return b.Anchor
}

// helperBlock lists a helper of the author's own as it is defined: its
// parameters and its formulas, without numbers.
func (c *composer) helperBlock(b *notebook.Block) []Entry {
	h := b.Tree.Helper
	if h == nil {
		return nil
	}
	params := make([]maths.Node, len(h.Params))
	for i, p := range h.Params {
		params[i] = c.maths.Name(p.Name.Text)
		if p.Default != nil {
			params[i] = maths.Pair(params[i], c.maths.Write(p.Default, nil))
		}
	}
	entries := []Entry{{
		Kind: HelperHead, Anchor: blockAnchor(b), Note: helperTitle(h), Refs: sources(h.Note.Source),
		Formula: maths.Chain{Left: maths.Call(maths.Word{Text: h.Name.Text}, params...)},
	}}
	for _, s := range h.Stmts {
		e := Entry{Kind: Definition, Indent: 1}
		switch s := s.(type) {
		case *syntax.Gap:
			e.Kind = Gap
		case *syntax.NoteLine:
			e.Kind, e.Note, e.Refs = NoteLine, s.Note.Text, sources(s.Note.Source)
		case *syntax.Needs:
			e.Kind, e.Note, e.Refs = Limit, s.Note.Text, sources(s.Note.Source)
			e.Formula.Left = maths.Inline(c.maths.Write(s.Cond, nil))
		case *syntax.Definition:
			e.Note, e.Refs = s.Note.Text, sources(s.Note.Source)
			e.Formula = maths.Chain{Left: c.maths.Name(s.Name.Text), Steps: equal(c.maths.Function(s, nil))}
			if s.Func {
				e.Formula.Left = c.signature(s.Name, s.Params)
			}
			e.Below = c.whereUnits(s, s.Unit)
		default:
			continue
		}
		entries = append(entries, e)
	}
	return entries
}
