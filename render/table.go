package render

import (
	"gusset/render/maths"
)

// Table is a table over rows: a schedule, values over rows, or utilisations.
// It formats its cells when asked, since a table may have very many.
type Table struct {
	Caption string
	Heads   []Head
	Rows    int
	// Printed are the rows that paper shows, in order; nil for all of them. A
	// screen shows all.
	Printed []int
	columns []column
}

// Head is the head of a column: words or a symbol, and the unit of the cells.
type Head struct {
	Words  string
	Symbol maths.Node
	Unit   maths.Unit
	Anchor string
	Right  bool // numbers, set flush right
}

// Left is the number of rows that paper leaves out.
func (t *Table) Left() int {
	if t.Printed == nil {
		return 0
	}
	return t.Rows - len(t.Printed)
}

// AppendCell appends a cell as plain text, "–" for a value that does not exist.
func (t *Table) AppendCell(dst []byte, row, col int) []byte {
	return t.columns[col].cell(dst, row)
}

// Governs tells whether a cell holds the entry that decides for its column.
func (t *Table) Governs(row, col int) bool { return t.columns[col].governs == row }

// Marked tells whether a row holds the entry that decides for any of the columns.
func (t *Table) Marked(row int) bool {
	for _, c := range t.columns {
		if c.governs == row {
			return true
		}
	}
	return false
}

// column is how the cells of a column are had.
type column struct {
	cell    func(dst []byte, row int) []byte
	governs int // -1 for none
}
