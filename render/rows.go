package render

import (
	"cmp"
	"math"
	"slices"
	"strconv"
	"strings"

	"gusset/notebook"
	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/render/maths"
	"gusset/units"
)

const (
	// maxColumns is how many values stand in one table beside the marks: more
	// do not fit the calculation column on paper.
	maxColumns = 6
	// wholeRows is how many rows paper shows before it leaves any out.
	wholeRows = 20
)

// valueTable is the table of values over the same rows.
func (c *composer) valueTable(steps []*eval.Step, full bool) *Table {
	t := steps[0].Value.Type
	table := &Table{Rows: t.Count()}
	table.addMarks(t, c.rowsNames(t))
	for _, s := range steps {
		c.addValue(table, s, c.maths.Symbol(s))
	}
	if !full && table.Rows > wholeRows {
		keep := map[int]bool{}
		for _, s := range steps {
			keep[s.Entry] = true
			extremes(s.Value.Num, keep)
		}
		table.print(keep)
	}
	return table
}

// rowsNames are the sets of rows of a value by their own names, or where two of
// them have one, as the calc calls them.
func (c *composer) rowsNames(t check.Type) []string {
	names := make([]string, len(t.Rows))
	for i, r := range t.Rows {
		names[i] = r.Name
		for k, o := range t.Rows {
			if k != i && o.Name == r.Name {
				names[i] = c.sheet.RowsName(r)
			}
		}
	}
	return names
}

// addMarks adds a column of marks for each set of rows.
func (t *Table) addMarks(typ check.Type, names []string) {
	stride := typ.Count()
	for i, r := range typ.Rows {
		stride /= max(r.N(), 1)
		step := stride
		t.Heads = append(t.Heads, Head{Words: names[i]})
		t.columns = append(t.columns, column{governs: -1, cell: func(dst []byte, row int) []byte {
			return append(dst, r.Marks[row/step%r.N()]...)
		}})
	}
}

// addValue adds a column for a value over rows.
func (c *composer) addValue(t *Table, s *eval.Step, symbol maths.Node) {
	head := Head{Symbol: symbol, Right: s.Value.Type.Kind != check.Text}
	if head.Right {
		head.Unit = c.maths.Unit(s.Unit)
	}
	t.Heads = append(t.Heads, head)
	t.columns = append(t.columns, column{governs: s.Entry, cell: func(dst []byte, row int) []byte {
		return appendFigures(dst, s.Printed(row))
	}})
}

// appendFigures appends a value whose unit stands in the head of its column.
func appendFigures(dst []byte, pieces []eval.Piece) []byte {
	if len(pieces) != 1 {
		return append(dst, eval.PlainText(pieces)...)
	}
	if p := pieces[0]; p.Figures != "" {
		return maths.AppendPlain(dst, maths.Number{Value: p.Figures})
	}
	return append(dst, pieces[0].Text...)
}

// extremes adds the entries with the smallest and the largest value.
func extremes(values []float64, keep map[int]bool) {
	low, high := -1, -1
	for i, v := range values {
		if math.IsNaN(v) {
			continue
		}
		if low < 0 || v < values[low] {
			low = i
		}
		if high < 0 || v > values[high] {
			high = i
		}
	}
	if low >= 0 {
		keep[low], keep[high] = true, true
	}
}

// print sets the rows that paper shows.
func (t *Table) print(keep map[int]bool) {
	t.Printed = make([]int, 0, len(keep))
	for row := range keep {
		t.Printed = append(t.Printed, row)
	}
	slices.Sort(t.Printed)
}

// schedule is the table of a schedule or of load cases as its author wrote it.
func (c *composer) schedule(b *notebook.Block) Entry {
	e := Entry{Kind: Tabular, Anchor: b.Anchor, Refs: sources(b.Source), Note: b.Note}
	if b.Name != "" {
		e.Note = b.Name
		if b.Note != "" {
			e.Note += ": " + b.Note
		}
	}
	if b.Rows == nil {
		return e
	}
	t := &Table{Rows: b.Rows.N()}
	if b.Marks < 0 {
		t.addMarks(check.Type{Rows: []*check.Rows{b.Rows}}, []string{"row"})
	}
	keep := map[int]bool{}
	for i, s := range b.Steps {
		name := s.Symbol
		if name == "" {
			name = s.ID
		}
		if last := lastPart(name); last != "" {
			name = last
		}
		if i == b.Marks || s.Value.Type.Kind == check.Text {
			t.Heads = append(t.Heads, Head{Words: name, Anchor: s.Anchor})
		} else {
			head := Head{Symbol: c.maths.Name(name), Anchor: s.Anchor, Right: true, Unit: c.maths.Unit(s.Unit)}
			t.Heads = append(t.Heads, head)
			extremes(s.Value.Num, keep)
			if s.Entry > 0 {
				keep[s.Entry] = true
			}
		}
		t.columns = append(t.columns, column{governs: -1, cell: func(dst []byte, row int) []byte {
			if row < len(s.Cells) && s.Cells[row] != "" {
				return append(dst, units.Typeset(s.Cells[row])...)
			}
			return appendFigures(dst, s.Printed(row))
		}})
	}
	if used := c.picks.printed(b.Tree, b.Rows); used != nil && !b.Full {
		t.print(used)
	} else if !b.Full && t.Rows > wholeRows && len(keep) > 0 {
		keep[0], keep[t.Rows-1] = true, true
		t.print(keep)
	}
	e.Tables = []*Table{t}
	return e
}

func lastPart(name string) string {
	for i := len(name) - 1; i >= 0; i-- {
		if name[i] == '.' {
			return name[i+1:]
		}
	}
	return name
}

// typeset is a text with its numbers as pages set them: the true minus, ×10ⁿ.
func typeset(text string) string {
	words := strings.Split(text, " ")
	for i, w := range words {
		figures := strings.TrimRight(w, ",;")
		if unsigned := strings.TrimPrefix(figures, "-"); unsigned == "" || !strings.Contains(".0123456789", unsigned[:1]) {
			continue
		}
		words[i] = units.Typeset(figures) + w[len(figures):]
	}
	return strings.Join(words, " ")
}

// checkTables are the utilisations of a check over rows: of every entry, or
// where it runs over several sets of rows the largest for each mark of each.
func (c *composer) checkTables(s *eval.Step, full bool) []*Table {
	r := s.Check
	if len(r.Type.Rows) == 1 {
		return []*Table{c.entriesTable(s, full)}
	}
	tables := make([]*Table, len(r.Type.Rows))
	for i := range r.Type.Rows {
		tables[i] = envelope(r, c.rowsNames(r.Type), i, full)
	}
	return tables
}

// entriesTable lists the entries of a check: the sides that vary, the
// utilisation, and the verdict.
func (c *composer) entriesTable(s *eval.Step, full bool) *Table {
	r := s.Check
	t := &Table{Rows: r.Type.Count()}
	t.addMarks(r.Type, c.rowsNames(r.Type))
	for i := range r.Sides {
		side := &r.Sides[i]
		if len(side.Value.Type.Rows) == 0 {
			continue
		}
		t.Heads = append(t.Heads, Head{Symbol: maths.Inline(c.maths.Write(side.Expr, s)), Unit: c.maths.Unit(side.Unit), Right: true})
		t.columns = append(t.columns, column{governs: r.Governs, cell: func(dst []byte, row int) []byte {
			return appendFigures(dst, side.Value.Printed(r.Type.Project(row, side.Value.Type), side.Unit, side.Figures))
		}})
	}
	same := func(row int) int { return row }
	t.addOutcome(r, same, r.Governs)
	if !full && t.Rows > wholeRows {
		t.print(worthPrinting(r, t.Rows, same))
	}
	return t
}

// envelope is the worst entry of a check for each mark of one set of its rows.
func envelope(r *eval.CheckResult, names []string, axis int, full bool) *Table {
	rows := r.Type.Rows[axis]
	worst := make([]int, rows.N())
	for i := range worst {
		worst[i] = -1
	}
	stride := 1
	for _, o := range r.Type.Rows[axis+1:] {
		stride *= o.N()
	}
	for entry := range r.OK {
		mark := entry / stride % rows.N()
		if worst[mark] < 0 || worse(r, entry, worst[mark]) {
			worst[mark] = entry
		}
	}
	t := &Table{Caption: "largest for each of " + names[axis], Rows: rows.N()}
	t.addMarks(check.Type{Rows: []*check.Rows{rows}}, names[axis:axis+1])
	at := func(row int) int { return worst[row] }
	governs := r.Governs / stride % rows.N()
	stride = r.Type.Count()
	for i, o := range r.Type.Rows {
		stride /= max(o.N(), 1)
		if i == axis {
			continue
		}
		step := stride
		t.Heads = append(t.Heads, Head{Words: "at " + names[i]})
		t.columns = append(t.columns, column{governs: governs, cell: func(dst []byte, row int) []byte {
			return append(dst, o.Marks[at(row)/step%o.N()]...)
		}})
	}
	t.addOutcome(r, at, governs)
	if !full && t.Rows > wholeRows {
		keep := worthPrinting(r, t.Rows, at)
		keep[governs] = true
		t.print(keep)
	}
	return t
}

// worse tells whether an entry of a check is worse than another: NG before OK
// before not required, then the larger ratio.
func worse(r *eval.CheckResult, a, b int) bool {
	if r.Required[a] != r.Required[b] {
		return r.Required[a]
	}
	if r.OK[a] != r.OK[b] {
		return !r.OK[a]
	}
	return cmp.Compare(r.Ratio[a], r.Ratio[b]) > 0 // NaN is the least
}

// addOutcome adds the columns of utilisations and verdicts.
func (t *Table) addOutcome(r *eval.CheckResult, entry func(row int) int, governs int) {
	t.Heads = append(t.Heads, Head{Words: "utilisation", Right: true}, Head{Words: "verdict"})
	t.columns = append(t.columns,
		column{governs: governs, cell: func(dst []byte, row int) []byte {
			i := entry(row)
			if !r.Required[i] || math.IsNaN(r.Ratio[i]) {
				return append(dst, "–"...)
			}
			text := eval.UtilisationText(r.Ratio[i], r.OK[i], r.Equal && i == r.Governs)
			if text == "" {
				text = strconv.FormatFloat(r.Ratio[i], 'f', 2, 64)
			}
			return append(dst, units.Typeset(text)...)
		}},
		column{governs: governs, cell: func(dst []byte, row int) []byte {
			switch i := entry(row); {
			case !r.Required[i]:
				return append(dst, "not required"...)
			case r.OK[i]:
				return append(dst, "OK"...)
			}
			return append(dst, "NG"...)
		}})
}

// worthPrinting are the rows of utilisations that paper shows: the governing
// one, the extremes, and the worst of those that are NG.
func worthPrinting(r *eval.CheckResult, rows int, entry func(row int) int) map[int]bool {
	keep := map[int]bool{}
	ratios := make([]float64, rows)
	var ng []int
	for row := range rows {
		i := entry(row)
		ratios[row] = r.Ratio[i]
		if !r.Required[i] {
			ratios[row] = math.NaN()
		} else if !r.OK[i] {
			ng = append(ng, row)
		}
		if i == r.Governs {
			keep[row] = true
		}
	}
	extremes(ratios, keep)
	slices.SortStableFunc(ng, func(a, b int) int { return -cmp.Compare(ratios[a], ratios[b]) })
	for _, row := range ng[:min(len(ng), wholeRows)] {
		keep[row] = true
	}
	return keep
}
