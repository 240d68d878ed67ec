package eval

import (
	"fmt"
	"math"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// firstOf tries the candidates in order. trials, where not nil, collects what was tried.
func (m *machine) firstOf(fo *check.FirstOf, f *frame, t *check.Type, entry int, trials *[]Trial) (any, int, error) {
	var col []float64
	count := len(fo.Values)
	if fo.Column != nil {
		count = fo.Rows.N()
		if fo.Column.Type.Kind != check.Text {
			col = m.ownColumn(fo.Column, f)
		}
	}
	step := &Step{Kind: Constant, ID: fo.Def.ID, Symbol: fo.Def.Symbol, Unit: m.candidateUnit(fo, f), Figures: m.figures()}
	f.steps[fo.Def.Slot] = step
	ct := fo.Cond.Type
	why := ""
	for k := 0; k < count; k++ {
		v := Value{Type: fo.Def.Type}
		var x any
		var err error
		switch {
		case col != nil && finite(col[k]):
			x = col[k]
		case fo.Column != nil:
			x, err = m.entry(fo.Column, f, &fo.Column.Type, k)
			err = atEntry(err, fo.Column.Type, k)
		default:
			x, err = m.entry(fo.Values[k], f, t, entry)
		}
		if err != nil {
			return nil, 0, err
		}
		v.set(x)
		f.vals[fo.Def.Slot], step.Value = v, v
		m.kept.forgetOf(fo.Def)
		at := 0
		for _, r := range ct.Rows {
			i := k
			if r != fo.Rows {
				i = digit(t, entry, r)
			}
			at = at*r.N() + i
		}
		ok, err := m.truth(fo.Cond, f, &ct, at)
		if err != nil {
			return nil, 0, err
		}
		if trials != nil || k == count-1 {
			outer := m.recording
			m.recording = nil // the calls in it are recorded
			why = m.verdict(fo.Cond, f, &ct, at, ok)
			m.recording = outer
		}
		if trials != nil {
			trial := Trial{Value: PlainText(v.Printed(0, step.Unit, step.Figures)), OK: ok, Why: why}
			if fo.Column == nil {
				trial.Value = m.candidateText(fo.Values[k], trial.Value)
			}
			if fo.Rows != nil && fo.Rows.Named {
				trial.Mark = fo.Rows.Marks[k]
			}
			*trials = append(*trials, trial)
		}
		if ok {
			if v.Type.Kind == check.Text {
				return v.Text[0], k, nil
			}
			return v.Num[0], k, nil
		}
	}
	last := PlainText(step.Value.Printed(0, step.Unit, step.Figures))
	if fo.Column == nil {
		last = m.candidateText(fo.Values[count-1], last)
	}
	told := fmt.Sprintf("none of the %d candidates will do: the last, %s,", count, last)
	if count == 1 {
		told = "the one candidate will not do: " + last
	}
	return nil, 0, &fault{id: diag.OutOfRange, at: fo.Expr.At, message: fmt.Sprintf("%s misses with %s", told, why),
		hints: []string{"add a further candidate, or change what the condition asks"}}
}

// candidateText is a listed candidate with the author's own figures.
func (m *machine) candidateText(n *check.Node, text string) string {
	if lit, ok := n.Expr.(*syntax.Number); ok {
		return PlainText(printLiteral(&Step{Literal: lit}))
	}
	return text
}

func (m *machine) candidateUnit(fo *check.FirstOf, f *frame) units.Unit {
	if fo.Def.Unit != nil {
		return *fo.Def.Unit
	}
	if fo.Column != nil {
		return m.nodeUnit(fo.Column, f)
	}
	return m.nodeUnit(fo.Values[0], f)
}

// verdict shows a condition as it came out: the comparison that failed with
// its values, turned round, and by how much it misses.
func (m *machine) verdict(n *check.Node, f *frame, t *check.Type, entry int, ok bool) string {
	if n.Op != check.Compare {
		for _, a := range n.Args {
			if a.Type.Kind != check.Condition {
				continue
			}
			holds, err := m.truth(a, f, t, entry)
			if err == nil && holds == ok {
				return m.verdict(a, f, t, entry, ok)
			}
		}
		return m.valuesIn(n, f, t, entry)
	}
	for i, op := range n.Cmp {
		a, b := n.Args[i], n.Args[i+1]
		figures := m.telling(n.Args[i:i+2], f, t, entry)
		left, right := m.shown(a, f, t, entry, figures), m.showIn(b, a, f, t, entry, figures)
		if m.bare(a, f) {
			left = m.showIn(a, b, f, t, entry, figures)
		}
		text := fmt.Sprintf("%s %s %s", left, sign(op), right)
		if ok {
			if i == len(n.Cmp)-1 {
				return text
			}
			continue
		}
		x, err1 := m.entry(a, f, t, entry)
		y, err2 := m.entry(b, f, t, entry)
		if err1 != nil || err2 != nil {
			return text
		}
		if xt, yt := asText(x), asText(y); xt != nil {
			if !compareText(op, *xt, *yt) {
				return fmt.Sprintf("%q %s %q", *xt, sign(turned(op)), *yt)
			}
			continue
		}
		xn, _ := x.(float64)
		yn, _ := y.(float64)
		if !compare(op, xn, yn) {
			return fmt.Sprintf("%s %s %s%s", left, sign(turned(op)), right, misses(op, xn, yn, a.Type.Kind))
		}
	}
	return ""
}

func asText(x any) *string {
	if s, ok := x.(string); ok {
		return &s
	}
	return nil
}

// showIn shows a side in the unit of the other, so that both can be compared by eye.
func (m *machine) showIn(n, other *check.Node, f *frame, t *check.Type, entry, figures int) string {
	u := m.nodeUnit(other, f)
	if _, own := m.namedUnit(n, n.Type, f); own && !m.bare(n, f) || u.Dim() != n.Type.Dim {
		return m.shown(n, f, t, entry, figures)
	}
	x, err := m.entry(n, f, t, entry)
	if err != nil {
		return "not known"
	}
	v := Value{Type: check.Type{Kind: n.Type.Kind, Dim: n.Type.Dim}}
	v.set(x)
	return PlainText(v.Printed(0, u, figures))
}

// misses says by how much a comparison of positive values fails.
func misses(op syntax.Op, a, b float64, kind check.Kind) string {
	if op == syntax.Gt || op == syntax.Ge {
		a, b = b, a
	}
	if kind == check.Point || op == syntax.Eq || op == syntax.Ne || a <= 0 || b <= 0 {
		return ""
	}
	return fmt.Sprintf(", %s %% over", units.Format(math.Max((a/b-1)*100, 0), 3))
}

func sign(op syntax.Op) string {
	switch op {
	case syntax.Le:
		return "≤"
	case syntax.Ge:
		return "≥"
	case syntax.Eq:
		return "="
	case syntax.Ne:
		return "≠"
	}
	return op.String()
}

func turned(op syntax.Op) syntax.Op {
	switch op {
	case syntax.Lt:
		return syntax.Ge
	case syntax.Le:
		return syntax.Gt
	case syntax.Gt:
		return syntax.Le
	case syntax.Ge:
		return syntax.Lt
	case syntax.Eq:
		return syntax.Ne
	}
	return syntax.Eq
}
