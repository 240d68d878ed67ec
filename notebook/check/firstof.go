package check

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// firstOf lowers `first of … with …`.
func (l *lower) firstOf(f *syntax.FirstOf, s *syntax.Definition, d *Def) Choice {
	out := &FirstOf{Expr: f}
	if l.unitOnLast(f.Values) {
		return Choice{}
	}
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
		case len(out.Values) > 0 && !l.askFreq(v, n, t.Freq, fmt.Sprintf("the first candidate is in %s", t.Freq.words())).ok():
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

// unitOnLast reports `first of 8, 10, 12 mm`, where one unit is to serve all.
func (l *lower) unitOnLast(values []syntax.Expr) bool {
	last, ok := values[len(values)-1].(*syntax.Number)
	if !ok || len(last.Pieces) != 1 || !last.Pieces[0].HasUnit {
		return false
	}
	unit, bare := " "+l.e.src.Slice(last.Pieces[0].UnitAt), 0
	words := make([]string, len(values))
	for i, v := range values {
		words[i] = l.print(v)
		if n, ok := v.(*syntax.Number); ok && len(n.Pieces) == 1 && !n.Pieces[0].HasUnit {
			words[i] += unit
			bare++
		}
	}
	if bare == 0 {
		return false
	}
	l.fail(diag.DimensionMismatch, values[0].Span().To(last.At), "each candidate has a unit of its own", "write `"+strings.Join(words, ", ")+"`")
	return true
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
