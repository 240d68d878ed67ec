package syntax

import (
	"fmt"
	"io"
	"strings"
)

// Dump writes a block's tree, one statement a line, expressions in prefix
// form: `tau [MPa] = P/(2*A)` is `def tau [MPa] (/ P (paren (* 2 A)))`.
func Dump(w io.Writer, b *Block) error {
	var d dumper
	d.block(b)
	_, err := io.WriteString(w, d.String())
	return err
}

// DumpExpr returns an expression in the form of Dump.
func DumpExpr(e Expr) string {
	var d dumper
	d.expr(e)
	return d.String()
}

type dumper struct{ strings.Builder }

func (d *dumper) put(format string, args ...any) { fmt.Fprintf(d, format, args...) }

func (d *dumper) block(b *Block) {
	d.put("%s", b.Kind)
	if b.Brief {
		d.put(" brief")
	}
	if b.Full {
		d.put(" full")
	}
	switch {
	case b.Helper != nil:
		d.put(" %s", d.nameText(b.Helper.Name))
	case b.Table != nil:
		d.put(" %s", d.nameText(b.Table.Name))
		if b.Table.From != "" {
			d.put(" from %q", b.Table.From)
		}
	case b.Figure != nil:
		d.put(" %s", b.Figure.Kind)
		d.args(b.Figure.Args)
	}
	d.note(b.Note)
	d.put("\n")
	switch {
	case b.Helper != nil:
		d.helper(b.Helper)
	case b.Table != nil:
		d.table(b.Table)
	case b.Plot != nil:
		d.plot(b.Plot)
	}
	for _, s := range b.Stmts {
		d.stmt(s)
	}
}

func (d *dumper) nameText(n *Name) string {
	if n == nil {
		return "?"
	}
	return n.ID
}

func (d *dumper) helper(h *Helper) {
	for _, p := range h.Params {
		d.put("  param %s", p.Name.ID)
		d.unit(p.Unit)
		if p.Default != nil {
			d.put(" = ")
			d.expr(p.Default)
		}
		d.note(p.Note)
		d.put("\n")
	}
	for _, s := range h.Stmts {
		d.stmt(s)
	}
	d.names("  gives", h.Gives)
	d.put("\n")
}

func (d *dumper) names(before string, names []*Name) {
	d.put("%s", before)
	for _, n := range names {
		d.put(" %s", n.ID)
	}
}

func (d *dumper) unit(u *UnitRef) {
	switch {
	case u == nil:
	case u.Column && u.Quantity != "":
		d.put(" [column of %s]", u.Quantity)
	default:
		d.put(" [%s]", u.Text)
	}
}

func (d *dumper) note(n Note) {
	if n.Text != "" {
		d.put(" # %s", n.Text)
	}
	if n.Source != "" {
		d.put(" [%s]", n.Source)
	}
}

func (d *dumper) table(t *Table) {
	d.put("  columns")
	for i, c := range t.Columns {
		if i > 0 {
			d.put(",")
		}
		d.put(" %s", d.nameText(c.Name))
		d.unit(c.Unit)
	}
	d.put("\n")
	for _, r := range t.Rows {
		d.put("  row")
		for i, c := range r.Cells {
			if i > 0 {
				d.put(" |")
			}
			switch {
			case c.Expr != nil:
				d.put(" ")
				d.expr(c.Expr)
			case c.Text == "":
				d.put(" -")
			default:
				d.put(" text %q", c.Text)
			}
		}
		d.put("\n")
	}
}

func (d *dumper) plot(p *Plot) {
	if p.Checks {
		d.put("  checks\n")
	}
	if p.Against != nil {
		d.names("  curves", p.Curves)
		d.put(" against %s from ", p.Against.ID)
		d.expr(p.From)
		d.put(" to ")
		d.expr(p.To)
		d.put("\n")
	}
	if p.Limits != nil {
		d.names("  limit", p.Limits)
		d.put("\n")
	}
	if p.Steps > 0 {
		d.put("  steps %d\n", p.Steps)
	}
	if p.Title != "" {
		d.put("  title %s\n", p.Title)
	}
}

func (d *dumper) stmt(s Stmt) {
	d.put("  ")
	switch s := s.(type) {
	case *Definition:
		d.definition(s)
	case *Check:
		d.put("check ")
		d.expr(s.Cond)
		if s.If != nil {
			d.put(" if ")
			d.expr(s.If)
		}
		d.note(s.Note)
	case *NoteLine:
		d.put("note")
		d.note(s.Note)
	case *Gap:
		d.put("gap")
	case *Needs:
		d.put("needs ")
		d.expr(s.Cond)
		if s.Warn {
			d.put(" else warn")
		}
		d.note(s.Note)
	case *Gives:
		d.names("gives", s.Names)
	case *BadStmt:
		d.put("bad")
		if s.Name != nil {
			d.put(" %s", s.Name.ID)
		}
	}
	d.put("\n")
}

func (d *dumper) definition(s *Definition) {
	d.put("def %s", s.Name.ID)
	if s.Func {
		d.put("(")
		for i, p := range s.Params {
			if i > 0 {
				d.put(" ")
			}
			d.put("%s", p.ID)
		}
		d.put(")")
	}
	d.unit(s.Unit)
	for i, b := range s.Branches {
		if i > 0 {
			d.put("\n     ")
		}
		d.put(" ")
		d.expr(b.Value)
		if b.Cond != nil {
			d.put(" if ")
			d.expr(b.Cond)
		}
		if b.Otherwise {
			d.put(" otherwise")
		}
		d.note(b.Note)
	}
	for i, w := range s.Where {
		if i == 0 {
			d.put(" where")
		}
		d.put(" %s", w.Name.ID)
		d.unit(w.Unit)
	}
	d.note(s.Note)
}

func (d *dumper) args(args []Arg) {
	for _, a := range args {
		d.put(" ")
		if a.Name != nil {
			d.put("%s=", a.Name.ID)
		}
		d.expr(a.Value)
		if a.Over != nil {
			d.put(" over %s", a.Over.ID)
		}
	}
}

func (d *dumper) expr(e Expr) {
	switch e := e.(type) {
	case *Name:
		d.put("%s", e.ID)
	case *Number:
		d.number(e)
	case *Text:
		d.put("%q", e.Value)
	case *Unary:
		d.put("(%s ", e.Op)
		d.expr(e.X)
		d.put(")")
	case *Binary:
		d.put("(%s ", e.Op)
		d.expr(e.X)
		d.put(" ")
		d.expr(e.Y)
		d.put(")")
	case *Compare:
		d.put("(")
		for i, x := range e.Operands {
			if i > 0 {
				d.put(" %s ", e.Ops[i-1])
			}
			d.expr(x)
		}
		d.put(")")
	case *Paren:
		d.put("(paren ")
		d.expr(e.X)
		d.put(")")
	case *Call:
		d.put("(call %s", e.Fun.ID)
		d.args(e.Args)
		d.put(")")
	case *AtMark:
		d.put("(at ")
		d.expr(e.X)
		d.put(" ")
		d.expr(e.Y)
		d.put(")")
	case *FirstOf:
		d.put("(first")
		for _, v := range e.Values {
			d.put(" ")
			d.expr(v)
		}
		d.put(" with ")
		d.expr(e.Cond)
		d.put(")")
	case *Bad:
		d.put("?")
	default:
		d.put("nothing")
	}
}

func (d *dumper) number(n *Number) {
	if n.Neg {
		d.put("-")
	}
	for i, p := range n.Pieces {
		if i > 0 {
			d.put("&")
		}
		d.put("%s", strings.Join(strings.Fields(p.Figures), "+"))
		if p.HasUnit {
			d.put("_%s", p.Unit)
		}
	}
}
