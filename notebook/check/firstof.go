package check

import (
	"fmt"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// firstOf lowers `first of … with …`.
func (l *lower) firstOf(f *syntax.FirstOf, s *syntax.Definition, d *Def) Choice {
	out := &FirstOf{Expr: f}
	t := Type{}
	for _, v := range f.Values {
		n := l.value(v)
		if !n.ok() {
			continue
		}
		if n = l.declare(s, v, n); !n.ok() {
			continue
		}
		switch {
		case len(n.Type.Rows) > 1 || len(n.Type.Rows) == 1 && len(f.Values) > 1:
			l.fail(diag.RowMismatch, v.Span(), fmt.Sprintf("the candidates are plain values, or one column: `%s` is %s", l.print(v), l.e.c.rowWords(n.Type)))
		case len(out.Values) > 0 && (n.Type.Dim != t.Dim || n.Type.Kind != t.Kind):
			l.mismatch(v.Span(), fmt.Sprintf("the candidates need one dimension: the first is %s, but `%s` is %s", l.e.c.describe(t), l.print(v), l.e.c.describe(n.Type)), t, n.Type)
		default:
			if len(out.Values) == 0 {
				t = n.Type
			}
			out.Values = append(out.Values, n)
		}
	}
	if l.failed || len(out.Values) == 0 {
		l.failed = true
		return Choice{}
	}
	if len(out.Values) == 1 && len(t.Rows) == 1 {
		out.Column, out.Rows, out.Values = out.Values[0], t.Rows[0], nil
	}
	return l.firstOfCond(f, s, d, out, t)
}

func (l *lower) firstOfCond(f *syntax.FirstOf, s *syntax.Definition, d *Def, out *FirstOf, t Type) Choice {
	t.Rows = nil
	cand := &Def{ID: d.ID, Symbol: d.Symbol, Line: d.Line, At: d.At, Slot: l.e.scope.newSlot(), Scope: l.e.scope, Type: t, used: true}
	if s.Unit != nil && s.Unit.Quantity == "" {
		cand.Unit = &s.Unit.Unit
	}
	inner := &env{c: l.e.c, src: l.e.src, scope: l.e.scope, names: map[string]*Def{d.ID: cand}, parent: l.e, library: l.e.library}
	outer := l.e
	l.e = inner
	out.Cond = l.condition(f.Cond)
	l.e = outer
	if !out.Cond.ok() {
		return Choice{}
	}
	out.Def = cand
	for _, r := range out.Cond.Type.Rows {
		if r != out.Rows {
			t.Rows = append(t.Rows, r)
		}
	}
	if out.Rows != nil {
		d.Picked = out.Rows
	}
	return Choice{Type: t, FirstOf: out}
}
