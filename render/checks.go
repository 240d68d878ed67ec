package render

import (
	"math"
	"strconv"

	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render/maths"
	"gusset/units"
)

// check sets a check: the entry that governs in full, and what came out.
func (c *composer) check(s *eval.Step, e *Entry, full bool) {
	r := s.Check
	e.Kind = Check
	e.Verdict = c.verdict(r)
	e.Formula = c.relation(s, r.Sides, r.Ops, r.Type, r.Governs, e.Verdict.OK)
	if !e.Verdict.Required {
		e.Formula = c.asWritten(s, r)
	}
	e.Mark = r.Type.Mark(r.Governs)
	e.Below = c.needed(s)
	if n := len(r.OK); len(r.Type.Rows) > 0 {
		e.Below = append(e.Below, Phrase{Before: counted(r, n)})
		e.Tables = c.checkTables(s, full)
	}
	e.Refs = append(e.Refs, carriedFrom(s)...)
}

// counted tells how many entries a check over rows has, and how they came out.
func counted(r *eval.CheckResult, n int) string {
	ng, free := 0, 0
	for i := range n {
		if !r.Required[i] {
			free++
		} else if !r.OK[i] {
			ng++
		}
	}
	text := strconv.Itoa(n) + " entries checked, all OK"
	if ng > 0 || free > 0 {
		text = strconv.Itoa(n) + " entries checked, " + strconv.Itoa(ng) + " NG"
	}
	if free > 0 {
		text += ", " + strconv.Itoa(free) + " not required"
	}
	return text
}

// verdict is how a whole check came out, the same for its entry and its line in
// the summary.
func (c *composer) verdict(r *eval.CheckResult) *Verdict {
	if v := c.verdicts[r]; v != nil {
		return v
	}
	v := &Verdict{OK: r.AllOK, Ratio: math.NaN()}
	c.verdicts[r] = v
	for _, required := range r.Required {
		v.Required = v.Required || required
	}
	switch {
	case !v.Required:
		v.Word = "not required"
		return v
	case v.OK:
		v.Word = "OK"
	default:
		v.Word = "NG"
	}
	if r.Governs < len(r.Ratio) {
		v.Ratio = r.Ratio[r.Governs]
		v.Utilisation = units.Typeset(eval.UtilisationText(v.Ratio, v.OK, r.Equal))
	}
	return v
}

// relation sets a chain of comparisons with the values of an entry: τ = 48.89 MPa ≤ 0.9 f_y = 0.9·355 MPa = 319.5 MPa.
func (c *composer) relation(s *eval.Step, sides []eval.Side, ops []syntax.Op, t check.Type, entry int, holds bool) maths.Chain {
	if len(ops) == 1 && ops[0] == syntax.Eq {
		return c.equality(s, sides, t, entry, holds)
	}
	chain := maths.Chain{Steps: make([]maths.Step, 0, 3*len(sides))}
	for i := range sides {
		written := c.maths.Write(sides[i].Expr, s)
		if i == 0 {
			chain.Left = written
		} else {
			chain.Steps = append(chain.Steps, maths.Step{Sign: ops[i-1].String(), Right: written})
		}
		if put := c.maths.Put(sides[i].Expr, s, t, entry); put != nil && !single(s, sides[i].Expr) {
			chain.Steps = append(chain.Steps, maths.Step{Sign: "=", Right: put})
		}
		if value := c.side(s, &sides[i], t, entry); value != nil && !same(value, written) {
			chain.Steps = append(chain.Steps, maths.Step{Sign: "=", Right: value})
		}
	}
	return chain
}

// equality sets a comparison with ==, whose sign must not be read as that of a
// value: k = 0.85 where it holds, else k = 0.85: 0.8533 ≠ 0.85.
func (c *composer) equality(s *eval.Step, sides []eval.Side, t check.Type, entry int, holds bool) maths.Chain {
	var written, values [2]maths.Node
	for i := range written {
		written[i] = c.maths.Write(sides[i].Expr, s)
		if values[i] = c.side(s, &sides[i], t, entry); values[i] == nil {
			values[i] = written[i]
		}
	}
	equality := maths.Row{written[0], maths.Relation("=="), written[1]}
	if !holds {
		return maths.Chain{
			Left:  append(equality, maths.Op{Sign: ":", Class: maths.Punct}, maths.Blank, values[0]),
			Steps: []maths.Step{{Sign: "!=", Right: values[1]}},
		}
	}
	chain := maths.Chain{Left: written[0], Steps: []maths.Step{{Sign: "==", Right: written[1]}}}
	if !same(values[1], written[1]) {
		chain.Steps = append(chain.Steps, maths.Step{Sign: "=", Right: values[1]})
	}
	return chain
}

// single tells whether an expression is a name alone, or a call whose own
// lines stand below: its value is all that can be put in.
func single(s *eval.Step, e syntax.Expr) bool {
	switch e := bare(e).(type) {
	case *syntax.Name:
		return true
	case *syntax.Call:
		for _, call := range s.Calls {
			if call.Expr == e {
				return true
			}
		}
	}
	return false
}

// bare takes an author's brackets off.
func bare(e syntax.Expr) syntax.Expr {
	for {
		p, ok := e.(*syntax.Paren)
		if !ok {
			return e
		}
		e = p.X
	}
}

// side is the value of one side of a comparison; nil for a literal, which is
// its own value.
func (c *composer) side(s *eval.Step, side *eval.Side, t check.Type, entry int) maths.Node {
	at := t.Project(entry, side.Value.Type)
	if at < 0 || at >= side.Value.Len() {
		return nil
	}
	pieces := side.Value.Printed(at, side.Unit, side.Figures)
	var ref maths.Ref
	switch e := bare(side.Expr).(type) {
	case *syntax.Number, *syntax.Text:
		return nil
	case *syntax.Unary:
		if _, literal := bare(e.X).(*syntax.Number); literal {
			return nil
		}
	case *syntax.Name:
		if e.Slot >= 0 && e.Slot < len(s.Uses) && s.Uses[e.Slot] != nil {
			used := s.Uses[e.Slot]
			own := used.Literal != nil || at < len(used.Cells) && used.Cells[at] != ""
			if own && used.Unit.Equal(side.Unit) {
				return c.maths.Value(used, at)
			}
			ref = maths.Ref{Target: c.maths.Anchor(used), Tip: c.maths.Tip(used, at)}
		}
	}
	return c.maths.Pieces(pieces, ref)
}

// asWritten sets a check without values.
func (c *composer) asWritten(s *eval.Step, r *eval.CheckResult) maths.Chain {
	chain := maths.Chain{Steps: make([]maths.Step, 0, len(r.Sides))}
	for i := range r.Sides {
		written := c.maths.Write(r.Sides[i].Expr, s)
		if i == 0 {
			chain.Left = written
		} else {
			chain.Steps = append(chain.Steps, maths.Step{Sign: r.Ops[i-1].String(), Right: written})
		}
	}
	return chain
}

// needed tells why a check with a condition is required or not.
func (c *composer) needed(s *eval.Step) []Phrase {
	stmt, ok := s.Stmt.(*syntax.Check)
	if !ok || stmt.If == nil {
		return nil
	}
	r := s.Check
	p := Phrase{Before: "required, since", Formula: maths.Chain{Left: c.maths.Write(stmt.If, s)}}
	if compare, ok := bare(stmt.If).(*syntax.Compare); ok && len(r.NeededIf) == len(compare.Operands) {
		p.Formula = c.relation(s, r.NeededIf, compare.Ops, r.Type, r.Governs, r.Governs < len(r.Required) && r.Required[r.Governs])
	} else if put := c.maths.Put(stmt.If, s, r.Type, r.Governs); put != nil {
		p.Formula.Left = maths.Row{p.Formula.Left, maths.Op{Sign: ":", Class: maths.Punct}, maths.Blank, put}
	}
	p.Formula = maths.InlineChain(p.Formula)
	if r.Governs < len(r.Required) && !r.Required[r.Governs] {
		p.Before, p.After = "not required:", "does not hold"
	}
	return []Phrase{p}
}

// limit sets a limit of validity that a helper was held to.
func (c *composer) limit(s *eval.Step, e *Entry) {
	e.Kind = Limit
	e.Verdict = &Verdict{OK: true, Required: true, Ratio: math.NaN(), Word: "holds"}
	r := s.Check
	if r != nil && !r.AllOK {
		e.Verdict.OK, e.Verdict.Word = false, "outside the limit"
	}
	needs, ok := s.Stmt.(*syntax.Needs)
	switch {
	case r != nil && len(r.Sides) > 0:
		e.Formula = c.relation(s, r.Sides, r.Ops, r.Type, r.Governs, e.Verdict.OK)
	case ok:
		e.Formula.Left = c.maths.Write(needs.Cond, s)
		if put := c.maths.Put(needs.Cond, s, check.Type{}, 0); put != nil {
			e.Below = []Phrase{{Before: "with values:", Formula: maths.Chain{Left: maths.Inline(put)}}}
		}
	}
	e.Formula = maths.InlineChain(e.Formula)
}
