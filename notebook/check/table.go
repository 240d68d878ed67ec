package check

import (
	"fmt"
	"strconv"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// table enters a schedule or a block of load cases: one value for each
// column, with one entry for each row.
func (c *checker) table(b *syntax.Block) {
	t := b.Table
	src := c.in.Source
	if t.From != "" {
		var ok bool
		if t, src, ok = c.readCSV(t); !ok {
			c.failedTable(b, t)
			return
		}
	}
	body := &body{c: c, e: c.top, block: c.block}
	l := body.lower(0)
	if t.Name == nil { // a schedule's; reported where it was read
		return
	}
	name := t.Name.ID
	if s, ok := c.spaces[name]; ok && name == "cases" && s.rows != nil {
		l.fail(diag.Redefined, b.Table.At, fmt.Sprintf("the load cases of this file stand already at line %d", s.line), "name the second block: `cases wind`")
		c.failedTable(b, t)
		return
	}
	if !body.fresh(l, t.Name, false) {
		c.failedTable(b, t)
		return
	}
	if len(t.Rows) > maxRows {
		l.fail(diag.BoundExceeded, b.Table.At, fmt.Sprintf("%s has %d rows, and the bound is %d", name, len(t.Rows), maxRows))
		c.failedTable(b, t)
		return
	}
	if len(t.Rows) == 0 { // reported where it was read
		c.failedTable(b, t)
		return
	}
	line := c.in.Source.LineAt(t.Name.At.Start)
	tab := &tableCheck{c: c, block: b, t: t, src: src, name: name, body: body}
	tab.sort()
	rows := tab.rows(line)
	what := "a schedule"
	if b.Kind == syntax.CasesBlock {
		what = "a set of load cases"
	}
	c.spaces[name] = &space{what: what, line: line, rows: rows}
	c.prog.BlockRows[c.block] = rows
	for i := range t.Columns {
		tab.column(i, rows)
	}
	c.prog.Plans = append(c.prog.Plans, body.plans...)
}

// failedTable enters the names of a table that could not be read, so that
// nothing is said again where they are used.
func (c *checker) failedTable(b *syntax.Block, t *syntax.Table) {
	line := c.in.Source.LineAt(b.Table.At.Start)
	if b.Kind == syntax.CasesBlock {
		if len(t.Columns) == 0 {
			c.lostCases = line
		}
		for i := range t.Columns {
			if n := t.Columns[i].Name; n != nil && c.top.names[n.ID] == nil {
				d := c.top.define(n, Type{})
				d.Failed, d.Because, d.Line = true, line, line
			}
		}
	}
	if t.Name == nil {
		return
	}
	if s := c.spaces[t.Name.ID]; s != nil { // the columns may be meant for either
		s.because = line
		return
	}
	c.spaces[t.Name.ID] = &space{what: "a schedule", line: line, rows: &Rows{Name: t.Name.ID}, because: line}
}

// tableCheck is the checking of one table.
type tableCheck struct {
	c     *checker
	block *syntax.Block
	t     *syntax.Table
	src   *diag.Source
	name  string
	body  *body
	text  []bool // by column
	marks int    // the first column of text, -1 for none
}

// lower lowers cells, whose messages point into the CSV file where there is one.
func (t *tableCheck) lower(slots int) *lower {
	l := t.body.lower(slots)
	l.declared = true
	if t.src != t.c.in.Source {
		l.e = &env{c: t.c, src: t.src, scope: t.c.top.scope, names: map[string]*Def{}, parent: t.c.top}
	}
	return l
}

// sort tells the columns of text from those of numbers. A column with a unit
// holds numbers. Without one it is text where it is the first column and its cells are no
// literals, or where most of its cells cannot be read as values.
func (t *tableCheck) sort() {
	t.text = make([]bool, len(t.t.Columns))
	t.marks = -1
	for i := range t.t.Columns {
		col := &t.t.Columns[i]
		if col.Unit == nil && col.Name != nil {
			t.text[i] = t.isText(i, col)
		}
		if t.text[i] && t.marks < 0 {
			t.marks = i
		}
	}
}

func (t *tableCheck) isText(i int, col *syntax.Column) bool {
	if i == 0 && (col.Name.ID == "mark" || col.Name.ID == "case") { // figures or not: `1`, `101`
		return true
	}
	literals, values, texts := 0, 0, 0
	for r := range t.t.Rows {
		cell := &t.t.Rows[r].Cells[i]
		switch {
		case cell.Text == "" && !cell.Quoted:
		case cell.Quoted:
			texts++
		case cell.Expr == nil:
			texts++
		case literal(cell.Expr):
			literals++
		case t.readable(cell.Expr):
			values++
		default:
			texts++
		}
	}
	if i == 0 && literals == 0 {
		return !onlyFormulas(t.t, i) || texts > 0
	}
	return texts > literals+values
}

// onlyFormulas tells that a column's cells are all more than bare names.
func onlyFormulas(t *syntax.Table, i int) bool {
	for r := range t.Rows {
		if _, name := t.Rows[r].Cells[i].Expr.(*syntax.Name); name || t.Rows[r].Cells[i].Expr == nil {
			return false
		}
	}
	return true
}

func literal(x syntax.Expr) bool {
	if u, ok := x.(*syntax.Unary); ok {
		x = u.X
	}
	_, ok := x.(*syntax.Number)
	return ok
}

// readable tells that all names of an expression stand for something.
func (t *tableCheck) readable(x syntax.Expr) bool {
	ok := true
	syntax.Walk(x, func(e syntax.Expr) bool {
		switch e := e.(type) {
		case *syntax.Name:
			key, _, dotted := head(e.ID)
			ok = ok && (t.c.top.lookup(e.ID) != nil || dotted && t.c.spaces[key] != nil)
		case *syntax.Text:
			ok = false
		case *syntax.Call:
			for _, a := range e.Args {
				ok = ok && t.readable(a.Value)
			}
			return false
		}
		return ok
	})
	return ok
}

// rows makes the table's set of rows from its column of marks.
func (t *tableCheck) rows(line int) *Rows {
	rows := &Rows{Name: t.name, File: t.c.in.Source.Name, Named: t.marks >= 0, Marks: make([]string, len(t.t.Rows))}
	t.c.order[rows] = len(t.c.order)
	first := map[string]int{}
	l := t.lower(0)
	for r := range t.t.Rows {
		if t.marks < 0 {
			rows.Marks[r] = strconv.Itoa(r + 1)
			continue
		}
		cell := &t.t.Rows[r].Cells[t.marks]
		mark := cell.Text
		rows.Marks[r] = mark
		here := t.src.LineAt(cell.At.Start)
		if cell.Missing {
			continue
		}
		if mark == "" {
			l.fail(diag.Syntax, t.t.Rows[r].At, fmt.Sprintf("the row has no mark: the column %s names the rows", t.t.Columns[t.marks].Name.Text))
			continue
		}
		if at, twice := first[mark]; twice {
			l.fail(diag.Redefined, cell.At, fmt.Sprintf("the mark `%s` stands at line %d already", mark, at), "each row has a mark of its own")
			continue
		}
		first[mark] = here
	}
	if len(t.t.Rows) == 0 {
		l.fail(diag.Syntax, t.t.At, fmt.Sprintf("%s has a header but no rows", t.name))
	}
	return rows
}

// column enters one column as a value over the rows.
func (t *tableCheck) column(i int, rows *Rows) {
	col := &t.t.Columns[i]
	if col.Name == nil {
		return
	}
	name := *col.Name
	if t.block.Kind == syntax.ScheduleBlock || i == t.marks && t.c.caseMarks[name.ID] {
		name.ID, name.Text = t.name+"."+col.Name.ID, t.name+"."+col.Name.Text
	}
	p := &Plan{Line: t.c.in.Source.LineAt(min(t.block.Table.At.Start, len(t.c.in.Source.Text))), Block: t.body.block, IsGiven: true}
	if t.src == t.c.in.Source {
		p.Line = t.src.LineAt(col.At.Start)
	}
	t.body.plans = append(t.body.plans, p)
	if t.block.Kind == syntax.CasesBlock && i == t.marks {
		t.c.caseMarks[name.ID] = true
	}
	l := t.lower(0)
	free := t.freshColumn(l, &name, col)
	d := &Def{ID: name.ID, Symbol: name.Text, Line: p.Line, At: col.At, Plan: p, Scope: t.c.top.scope, Slot: t.c.top.scope.newSlot()}
	if t.src != t.c.in.Source {
		d.At = t.block.Table.At
	}
	d.Type = Type{Kind: Text, Rows: []*Rows{rows}}
	p.Def = d
	p.Column = &ColumnPlan{Rows: rows, Trees: make([]*syntax.Cell, len(t.t.Rows))}
	for r := range t.t.Rows {
		p.Column.Trees[r] = &t.t.Rows[r].Cells[i]
	}
	if t.text[i] {
		for r := range t.t.Rows {
			p.Column.Texts = append(p.Column.Texts, t.t.Rows[r].Cells[i].Text)
		}
		d.Texts = p.Column.Texts
	} else {
		t.numbers(l, i, col, p)
	}
	if l.failed || col.Failed {
		t.body.failed(p, l)
	}
	if free {
		t.c.top.names[d.ID] = d
	}
}

func (t *tableCheck) freshColumn(l *lower, n *syntax.Name, col *syntax.Column) bool {
	what, line := t.c.occupied(n.ID)
	if what == "" {
		return true
	}
	l.fail(diag.Redefined, col.At, fmt.Sprintf("%s is already defined as %s, at line %d", n.Text, what, line), "a name is defined once; give the column another name")
	return false
}

// numbers lowers the cells of a column of numbers to one dimension.
func (t *tableCheck) numbers(l *lower, i int, col *syntax.Column, p *Plan) {
	d := p.Def
	d.Type.Kind = Invalid
	if col.Unit != nil {
		u := col.Unit.Unit
		d.Unit = &u
		d.Type.Kind, d.Type.Dim, d.Type.Freq = Number, u.Dim(), freqOf(u)
		if u.IsPoint() {
			d.Type.Kind = Point
		}
	}
	p.Column.Cells = make([]*Node, len(t.t.Rows))
	p.Column.Uses = make([][]*Def, len(t.t.Rows))
	for r := range t.t.Rows {
		cell := &t.t.Rows[r].Cells[i]
		n := t.cell(l, cell, col, d)
		p.Column.Cells[r] = n
		p.Column.Uses[r] = l.uses
		if n.ok() && !literal(cell.Expr) {
			p.IsGiven = false
		}
	}
	if d.Type.Kind == Invalid && !l.failed {
		d.Type.Kind = Number
	}
	for r, n := range p.Column.Cells { // a 0 above the first temperature
		if n.zero && l.noZero(d.Type, t.t.Rows[r].Cells[i].Expr) {
			return
		}
	}
}

const noCell = "a column of numbers has a value in each row"

// noValue is what stands in tables where there is no value, though it could be
// read as a formula.
var noValue = map[string]bool{"n/a": true, "N/A": true, "NA": true, "nil": true, "none": true, "TBC": true, "tbc": true, "TBD": true, "tbd": true}

// cell lowers one cell: a number in the header's unit, a quantity with its
// own unit, or an expression of names above.
func (t *tableCheck) cell(l *lower, cell *syntax.Cell, col *syntax.Column, d *Def) *Node {
	l.uses = make([]*Def, cell.Slots)
	if cell.Expr == nil {
		switch {
		case cell.Missing:
			l.failed = true
			return invalid
		case cell.Text == "":
			return l.fail(diag.Syntax, cell.At, fmt.Sprintf("the cell under %s is empty", col.Name.Text), noCell)
		case cell.Err != nil:
			l.failed = true
			e := *cell.Err
			e.Source = t.src
			t.c.report(e)
			return invalid
		}
		return l.fail(diag.Syntax, cell.At, fmt.Sprintf("`%s` under %s cannot be read as a number", cell.Text, col.Name.Text))
	}
	if noValue[cell.Text] {
		return l.fail(diag.Syntax, cell.At, fmt.Sprintf("the cell under %s has no value, but `%s`", col.Name.Text, cell.Text), noCell)
	}
	if cell.Err != nil {
		e := *cell.Err // a warning, since the cell could be read
		e.Source = t.src
		t.c.report(e)
	}
	n := l.value(cell.Expr)
	if !n.ok() || col.Failed {
		return n
	}
	if len(n.Type.Rows) > 0 {
		return l.fail(diag.RowMismatch, cell.At, fmt.Sprintf("a cell holds one value, but `%s` is %s", l.print(cell.Expr), l.e.c.rowWords(n.Type)),
			"pick one with `at`, or reduce it, for instance with `max(…)`")
	}
	if n.Type.Kind == Text {
		return l.fail(diag.DimensionMismatch, cell.At, fmt.Sprintf("`%s` is a text in a column of numbers", cell.Text))
	}
	if col.Unit != nil && bareNumber(n) {
		return l.inUnit(n, col.Unit.Unit, d.Type)
	}
	if d.Type.Kind == Invalid {
		if n.zero {
			return n
		}
		d.Type.Kind, d.Type.Dim, d.Type.Freq = n.Type.Kind, n.Type.Dim, n.Type.Freq
		d.Unit = argUnit(n)
		return n
	}
	if n.zero && d.Type.Kind == Number {
		return n
	}
	if n.Type.Dim != d.Type.Dim || n.Type.Kind != d.Type.Kind {
		message := fmt.Sprintf("%s holds %s, but `%s` is %s", col.Name.Text, l.e.c.describe(Type{Kind: d.Type.Kind, Dim: d.Type.Dim}), l.print(cell.Expr), l.e.c.describe(n.Type))
		if _, ok := cell.Expr.(*syntax.Number); ok && d.Unit != nil && d.Unit.String() != "" {
			hint := "a figure without a unit is in " + d.Unit.String() + ", as the header says"
			if col.Unit == nil {
				hint = "the header names the unit of bare figures: write `" + col.Name.Text + " [" + d.Unit.String() + "]`"
			}
			return l.fail(diag.DimensionMismatch, cell.At, message, hint)
		}
		l.mismatch(cell.At, message, Type{Kind: d.Type.Kind, Dim: d.Type.Dim}, n.Type)
		return invalid
	}
	return l.askFreq(cell.Expr, n, d.Type.Freq, fmt.Sprintf("%s is declared in %s", col.Name.Text, d.Type.Freq.words()))
}

// bareNumber tells that a cell is a number without a unit, whose unit is the header's.
func bareNumber(n *Node) bool {
	if n.Type.Kind != Number || !n.Type.Dim.IsNumber() || !n.plain {
		return false
	}
	if lit, ok := n.Expr.(*syntax.Number); ok && n.Op == Const {
		return !lit.Pieces[0].HasUnit
	}
	return n.rat() != nil
}

// inUnit is a bare number under a header's unit, exact to the last bit.
func (l *lower) inUnit(n *Node, u units.Unit, t Type) *Node {
	out := l.node(Node{Op: Const, Expr: n.Expr, Type: Type{Kind: t.Kind, Dim: t.Dim, Freq: t.Freq}})
	if lit, ok := n.Expr.(*syntax.Number); ok && n.Op == Const {
		p := lit.Pieces[0]
		p.Unit = u
		out.Num = p.SI(lit.Neg)
		return out
	}
	out.Num = u.LiteralToSI(n.rat())
	return out
}
