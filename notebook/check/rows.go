package check

import (
	"bytes"
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// reduce lowers a reduction of rows: all of them, or those named by `over`.
func (l *lower) reduce(x *syntax.Call, arg *Node) *Node {
	fn := x.Fun.ID
	a := x.Args[0]
	var over, kept []*Rows
	for _, r := range arg.Type.Rows {
		if r.Swept {
			kept = append(kept, r)
		} else {
			over = append(over, r)
		}
	}
	if len(over) == 0 {
		hints := []string{"a value has rows where it comes from a schedule or from load cases"}
		if fn == "min" || fn == "max" {
			hints = append(hints, fmt.Sprintf("`%s(a, b)` compares several plain values", fn))
		}
		return l.fail(diag.RowMismatch, a.Value.Span(), fmt.Sprintf("`%s` is a plain value: it has no rows for %s to reduce", l.print(a.Value), fn), hints...)
	}
	if arg.Type.Kind == Text && fn != "count" || arg.Type.Kind == Condition {
		return l.fail(diag.DimensionMismatch, a.Value.Span(), fmt.Sprintf("%s reduces numbers, but `%s` is %s", fn, l.print(a.Value), l.e.c.describe(arg.Type)))
	}
	if arg.Type.Kind == Point && (fn == "sum" || fn == "extreme") {
		return l.fail(diag.DimensionMismatch, a.Value.Span(), fmt.Sprintf("temperature points have no %s", fn), "points go through min, max, mean and interpolate")
	}
	n := l.node(Node{Op: Reduce, Expr: x, Args: l.args(arg), Type: arg.Type, Detail: l.detail(Detail{Fn: fn, Over: over})})
	n.Type.Rows = kept
	switch fn {
	case "sum":
		n.Type.Freq = NoFreq
	case "count":
		n.Type.Kind, n.Type.Dim, n.Type.Freq = Number, units.Dimension{}, NoFreq
	}
	if a.Over == nil {
		return n
	}
	rows := l.rowsNamed(a.Over, arg.Type.Rows)
	if rows == nil {
		return invalid
	}
	n.Over, n.Type.Rows = []*Rows{rows}, nil
	for _, r := range arg.Type.Rows {
		if r != rows {
			n.Type.Rows = append(n.Type.Rows, r)
		}
	}
	return n
}

// rowsNamed finds the rows that `over` names among those a value has.
func (l *lower) rowsNamed(name *syntax.Name, among []*Rows) *Rows {
	rows := l.e.c.rowsByName(name.ID)
	for _, r := range among {
		if r == rows || rows == nil && l.site != nil && r.Name == name.ID {
			return r
		}
	}
	var names []string
	for _, r := range among {
		names = append(names, l.e.c.rowsName(r))
	}
	if key, base, dotted := head(name.ID); rows == nil && dotted && l.e.c.spaces[key] != nil && l.e.c.spaces[key].from != nil {
		if sets := l.e.c.spaces[key].from.Shared[base]; len(sets) > 0 {
			var full []string
			for _, s := range sets {
				full = append(full, "`"+key+"."+s+"`")
			}
			l.fail(diag.RowMismatch, name.At, fmt.Sprintf("`%s` may be any of %s, which are different sets of rows", name.Text, list(full)), "name the one that is meant")
			return nil
		}
	}
	if rows == nil {
		hint := "the value runs over " + list(names)
		l.fail(diag.UnknownName, name.At, fmt.Sprintf("there are no rows called `%s`", name.Text), hint)
		return nil
	}
	l.fail(diag.RowMismatch, name.At, fmt.Sprintf("the value has no rows of %s: it has one entry for each of %s", name.Text, list(names)))
	return nil
}

func (l *lower) interpolate(x *syntax.Call, args []*Node) *Node {
	xs, ys, at := args[0], args[1], args[2]
	if len(xs.Type.Rows) != 1 || len(ys.Type.Rows) != 1 || xs.Type.Rows[0] != ys.Type.Rows[0] {
		return l.fail(diag.RowMismatch, x.At, fmt.Sprintf("interpolate takes two columns of one table, but `%s` is %s and `%s` is %s",
			l.print(x.Args[0].Value), l.e.c.rowWords(xs.Type), l.print(x.Args[1].Value), l.e.c.rowWords(ys.Type)),
			"write `"+builtins["interpolate"].usage+"`")
	}
	for i, a := range args {
		if a.Type.Kind == Text {
			return l.fail(diag.DimensionMismatch, x.Args[i].Value.Span(), fmt.Sprintf("interpolate takes numbers, but `%s` is a text", l.print(x.Args[i].Value)))
		}
	}
	if at.zero && l.noZero(xs.Type, x.Args[2].Value) {
		return invalid
	}
	if !at.zero && (at.Type.Dim != xs.Type.Dim || (at.Type.Kind == Point) != (xs.Type.Kind == Point)) {
		l.mismatch(x.Args[2].Value.Span(), fmt.Sprintf("`%s` is looked up among values of another dimension: it is %s, but `%s` holds %s",
			l.print(x.Args[2].Value), l.e.c.describe(at.Type), l.print(x.Args[0].Value), l.e.c.describe(xs.Type)), xs.Type, at.Type)
		return invalid
	}
	if !l.askFreq(x.Args[2].Value, at, xs.Type.Freq, fmt.Sprintf("`%s` is in %s", l.print(x.Args[0].Value), xs.Type.Freq.words())).ok() {
		return invalid
	}
	t := ys.Type
	t.Rows, t.Freq = at.Type.Rows, NoFreq
	return l.node(Node{Op: Interp, Expr: x, Args: args, Type: t})
}

// atMark lowers `column at mark`.
func (l *lower) atMark(x *syntax.AtMark) *Node {
	col := l.value(x.X)
	if !col.ok() {
		l.value(x.Y)
		return invalid
	}
	mark := l.mark(x.Y)
	if !mark.ok() {
		return invalid
	}
	if len(col.Type.Rows) == 0 {
		return l.fail(diag.RowMismatch, x.X.Span(), fmt.Sprintf("`%s` is a plain value: `at` picks a row of a value with rows", l.print(x.X)))
	}
	n := l.node(Node{Op: At, Expr: x, Args: l.args(col, mark), Type: col.Type, Detail: l.detail(Detail{})})
	n.Type.Freq = col.Type.Freq
	if mark.Type.Kind != Text {
		if mark.Op == Load && mark.Def.Picked != nil {
			return l.atPicked(x, n, mark)
		}
		return l.fail(diag.DimensionMismatch, x.Y.Span(), fmt.Sprintf("a row is picked by its mark, a text, but `%s` is %s", l.print(x.Y), l.e.c.describe(mark.Type)),
			`a mark stands in quotes, `+"`"+l.print(x.X)+` at "`+l.print(x.Y)+`"`+"`"+`, or in a text value`)
	}
	rows := l.rowsWithMark(x, col, mark)
	if rows == nil {
		return invalid
	}
	if mark.Op == TextLit && !hasMark(rows, mark.Str) {
		return l.noRow(x, rows, mark.Str)
	}
	return l.without(x, n, rows, mark)
}

// mostNear bounds among how many marks a message looks for the one that was meant.
const mostNear = 1000

// noRow reports a mark that no row has, of a branch that is not taken too.
func (l *lower) noRow(x *syntax.AtMark, rows *Rows, mark string) *Node {
	message, hint := rows.NoRow(mark, rows.N() <= mostNear)
	return l.fail(diag.UnknownMark, x.Y.Span(), message, hint)
}

// NoRow is the message that no row has a mark, and its hint: the mark that was
// meant, where it may be looked for, else what marks there are.
func (r *Rows) NoRow(mark string, look bool) (message, hint string) {
	message = fmt.Sprintf("%s has no row `%s`", r.Name, mark)
	if !r.Named {
		return message, fmt.Sprintf("its rows have no marks but their numbers, 1 to %d; a column that is called `mark`, or holds texts, has marks", r.N())
	}
	if look {
		if near := diag.Nearest(mark, r.Marks); near != "" {
			return message, "did you mean `" + near + "`?"
		}
	}
	if r.N() > 8 {
		return message, fmt.Sprintf("its rows are %s and %d more", strings.Join(r.Marks[:8], ", "), r.N()-8)
	}
	return message, "its rows are " + strings.Join(r.Marks, ", ")
}

// mark lowers what stands behind `at`; a bare mark gets its quotes offered.
func (l *lower) mark(y syntax.Expr) *Node {
	name, ok := y.(*syntax.Name)
	if !ok || l.e.lookup(name.ID) != nil || strings.Contains(name.ID, ".") {
		return l.value(y)
	}
	for _, r := range l.e.c.prog.BlockRows {
		if r == nil {
			continue
		}
		if !l.e.c.looks.May(1 + len(r.Marks)) {
			break
		}
		for _, m := range r.Marks {
			if m == name.Text || strings.HasPrefix(m, name.Text) && bytes.HasPrefix(l.e.src.Text[name.At.Start:], []byte(m)) {
				return l.fail(diag.UnknownName, name.At, fmt.Sprintf("`%s` is no value; it is a mark of %s", m, r.Name), fmt.Sprintf("write the mark in quotes: `at \"%s\"`", m))
			}
		}
	}
	return l.value(y)
}

// without takes the rows that were looked up out of the result, and puts the
// rows of the mark in.
func (l *lower) without(x *syntax.AtMark, n *Node, rows *Rows, mark *Node) *Node {
	var rest []*Rows
	for _, r := range n.Type.Rows {
		if r != rows {
			rest = append(rest, r)
		}
	}
	all, err := l.e.c.union(rest, mark.Type.Rows)
	if err != nil {
		return l.failRows(x.Span(), err)
	}
	n.Over = []*Rows{rows}
	n.Type.Rows = all
	return n
}

// atPicked lowers `plates.w at t`, where t was itself picked from plates.
func (l *lower) atPicked(x *syntax.AtMark, n, picked *Node) *Node {
	rows := picked.Def.Picked
	if rows.Swept {
		return l.fail(diag.RowMismatch, x.Span(), fmt.Sprintf("`%s` looks up the row that %s was picked from, and over the range of a plot %s stands between the rows", l.print(x), picked.Def.Symbol, picked.Def.Symbol),
			"the plot may run along another value, or its curve use figures that are not looked up by "+picked.Def.Symbol)
	}
	for _, r := range n.Type.Rows {
		if r == rows {
			n.Op = AtRow
			return l.without(x, n, rows, picked)
		}
	}
	return l.fail(diag.RowMismatch, x.Span(), fmt.Sprintf("%s was picked from %s, but `%s` is %s", picked.Def.ID, l.e.c.rowsName(rows), l.print(x.X), l.e.c.rowWords(n.Type)))
}

// rowsWithMark says which of the value's sets of rows has the mark. With one
// set there is no question; with two the marks must be known before anything
// is computed.
func (l *lower) rowsWithMark(x *syntax.AtMark, col, mark *Node) *Rows {
	if len(col.Type.Rows) == 1 {
		return col.Type.Rows[0]
	}
	texts := mark.texts()
	if texts == nil {
		l.fail(diag.RowMismatch, x.Span(), fmt.Sprintf("`%s` is %s, and the mark is not known before it is computed", l.print(x.X), l.e.c.rowWords(col.Type)),
			"reduce one of the two sets of rows first")
		return nil
	}
	var found []*Rows
	word := texts[0]
	for _, t := range texts {
		if in := withMark(col.Type.Rows, t); len(in) > len(found) {
			found, word = in, t
		}
	}
	if len(found) == 1 {
		return found[0]
	}
	var names []string
	for _, r := range col.Type.Rows {
		names = append(names, l.e.c.rowsName(r))
	}
	if len(found) == 0 {
		l.fail(diag.UnknownMark, x.Y.Span(), fmt.Sprintf("neither of %s has a row `%s`", list(names), word))
		return nil
	}
	l.fail(diag.UnknownMark, x.Y.Span(), fmt.Sprintf("%s both have a row `%s`", list(names), word), "give the rows of one of them other marks")
	return nil
}

// texts are the texts that a node may have, where they are known before
// anything is computed: a mark that is looked up is one of its column's.
func (n *Node) texts() []string {
	switch n.Op {
	case At, AtRow:
		return n.Args[0].texts()
	case TextLit:
		return []string{n.Str}
	case Load:
		return n.Def.Texts
	}
	return nil
}

// withMark are the sets that have a row of that mark.
func withMark(sets []*Rows, mark string) (in []*Rows) {
	for _, r := range sets {
		if hasMark(r, mark) {
			in = append(in, r)
		}
	}
	return in
}

func hasMark(r *Rows, mark string) bool {
	for _, m := range r.Marks {
		if m == mark {
			return true
		}
	}
	return false
}
