package check

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// FigurePlan is a sketch with what its parameters stand for, in their order;
// nil where an optional one is absent.
type FigurePlan struct {
	Tree   *syntax.Figure
	Kind   *FigureKind
	Args   []*Node
	Uses   []*Def
	Failed bool
}

// FigureKind is a kind of sketch and the parameters it draws.
type FigureKind struct {
	Name   string
	About  string
	Params []FigureParam
}

// FigureParam is one value that a sketch draws, by its quantity's unit.
type FigureParam struct {
	Name     string
	Unit     string
	Column   bool
	Optional bool
}

// FigureKinds are the sketches that a calc may hold.
func FigureKinds() []*FigureKind { return figureKinds }

var figureKinds = []*FigureKind{
	{"mohr", "Mohr's circle of a plane state of stress", []FigureParam{{Name: "sigma_x", Unit: "Pa"}, {Name: "sigma_y", Unit: "Pa"}, {Name: "tau_xy", Unit: "Pa"}}},
	{"element", "a stress element with its arrows", []FigureParam{{Name: "sigma_x", Unit: "Pa"}, {Name: "sigma_y", Unit: "Pa"}, {Name: "tau_xy", Unit: "Pa"}}},
	{"group", "a group of fasteners with the forces on them", []FigureParam{{Name: "x", Unit: "m", Column: true}, {Name: "y", Unit: "m", Column: true},
		{Name: "F_x", Unit: "N", Column: true}, {Name: "F_y", Unit: "N", Column: true}}},
	{"shear-angle", "a block sheared by its angle", []FigureParam{{Name: "gamma", Unit: ""}}},
	{"stress-strain", "an elastic-plastic curve with the present point", []FigureParam{{Name: "G", Unit: "Pa"}, {Name: "tau_y", Unit: "Pa"}, {Name: "gamma", Unit: ""}}},
	{"pin", "a pin in double shear", []FigureParam{{Name: "d", Unit: "m"}, {Name: "t_1", Unit: "m"}, {Name: "t_2", Unit: "m"}, {Name: "g", Unit: "m", Optional: true}}},
	{"head", "a plate pulled through by a head", []FigureParam{{Name: "d", Unit: "m"}, {Name: "t", Unit: "m"}, {Name: "d_s", Unit: "m", Optional: true}, {Name: "l", Unit: "m", Optional: true}}},
	{"lap", "a lap with a row of fasteners", []FigureParam{{Name: "t_1", Unit: "m"}, {Name: "t_2", Unit: "m"}, {Name: "d", Unit: "m"}, {Name: "n", Unit: ""}, {Name: "p", Unit: "m", Optional: true}}},
}

func figureUsage(k *FigureKind) string {
	var b strings.Builder
	b.WriteString("figure " + k.Name + " ")
	for i, p := range k.Params {
		if i > 0 {
			b.WriteString(", ")
		}
		b.WriteString(p.Name)
		if p.Optional {
			b.WriteString(" (optional)")
		}
	}
	return b.String()
}

func (c *checker) figure(block int, t *syntax.Figure) {
	plan := &FigurePlan{Tree: t}
	c.prog.Figures[block] = plan
	if t.Kind == "" { // reported where it was read
		plan.Failed = true
		return
	}
	l := &lower{e: c.top, uses: make([]*Def, t.Slots), declared: true}
	defer func() { plan.Failed, plan.Uses = l.failed, l.uses }()
	var names []string
	for _, k := range figureKinds {
		names = append(names, k.Name)
		if k.Name == t.Kind {
			plan.Kind = k
		}
	}
	if plan.Kind == nil {
		hints := []string{"the figures are " + list(names)}
		if near := diag.Nearest(t.Kind, names); near != "" {
			hints = append([]string{"did you mean `" + near + "`?"}, hints...)
		}
		l.fail(diag.UnknownName, t.KindAt, fmt.Sprintf("there is no figure `%s`", t.Kind), hints...)
		return
	}
	params := make([]*syntax.Name, len(plan.Kind.Params))
	for i, p := range plan.Kind.Params {
		params[i] = &syntax.Name{ID: p.Name, Text: p.Name, Slot: -1}
	}
	call := &syntax.Call{At: t.At, Fun: &syntax.Name{At: t.KindAt, ID: t.Kind, Text: "figure " + t.Kind, Slot: -1}, Args: t.Args}
	values, ok := l.bind(call, params, func(i int) bool { return plan.Kind.Params[i].Optional }, figureUsage(plan.Kind))
	if !ok {
		return
	}
	plan.Args = make([]*Node, len(values))
	for i, v := range values {
		if v != nil {
			plan.Args[i] = l.figureArg(plan.Kind, plan.Kind.Params[i], v)
		}
	}
	l.figureRows(t, plan)
}

func (l *lower) figureArg(k *FigureKind, p FigureParam, v syntax.Expr) *Node {
	n := l.value(v)
	if !n.ok() {
		return n
	}
	want := Type{Kind: Number}
	if p.Unit != "" {
		want.Dim = mustDim(p.Unit)
	}
	if !n.zero && (n.Type.Kind != Number || n.Type.Dim != want.Dim) {
		l.mismatch(v.Span(), fmt.Sprintf("figure %s draws %s as %s, but `%s` is %s", k.Name, p.Name, l.e.c.describe(want), l.print(v), l.e.c.describe(n.Type)), want, n.Type)
		return invalid
	}
	if p.Column && len(n.Type.Rows) == 0 {
		return l.fail(diag.RowMismatch, v.Span(), fmt.Sprintf("figure %s takes a column for %s, but `%s` is a plain value", k.Name, p.Name, l.print(v)))
	}
	return n
}

// figureRows holds the columns of a group to the rows of its positions.
func (l *lower) figureRows(t *syntax.Figure, plan *FigurePlan) {
	if l.failed || !plan.Kind.Params[0].Column {
		return
	}
	rows := plan.Args[0].Type.Rows
	for i, n := range plan.Args {
		if n == nil || !plan.Kind.Params[i].Column {
			continue
		}
		if i < 2 && (len(n.Type.Rows) != 1 || n.Type.Rows[0] != rows[0]) || len(columnRows(rows, n.Type.Rows)) > 0 {
			l.fail(diag.RowMismatch, n.Expr.Span(), fmt.Sprintf("figure %s needs one value for each of %s, but `%s` is %s", plan.Kind.Name, l.e.c.rowsName(rows[0]), l.print(n.Expr), l.e.c.rowWords(n.Type)))
			return
		}
	}
}
