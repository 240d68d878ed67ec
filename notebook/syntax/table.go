package syntax

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
)

// tableHead reads what stands behind `schedule` or `cases`: a name, `from` with
// a file, and `full`.
func (p *parser) tableHead(b *Block, seg Line) {
	t := b.Table
	want := "" // `file` behind `from`
	kind := b.Kind.String()
	p.words(seg, func(start, end int) {
		word := p.s[start:end]
		switch {
		case want == "file":
			want = ""
			t.From, t.FromAt = strings.Trim(word, `"`), p.span(start, end)
		case word == "from" && t.From == "":
			want = "file"
		case word == "full":
			b.Full = true
		case t.Name == nil && t.From == "":
			p.whole(start, end)
			if t.Name = p.plainName("a " + kind + "'s name"); t.Name != nil && p.tok != tEnd {
				p.syntax(p.start, p.pos, fmt.Sprintf("%s is out of place in a name", quoted(p.here())))
			}
		case len(p.diags) > 0: // said once
		default:
			p.report(diag.Error, p.span(start, end), diag.Syntax, fmt.Sprintf("%s is out of place behind `%s`", quoted(word), kind),
				fmt.Sprintf("the line is `%s NAME`, then `from FILE.csv` or `full`", kind))
		}
	})
	switch {
	case want == "file":
		p.report(diag.Error, p.span(seg.End-len("from"), seg.End), diag.Syntax, "the file behind `from` is missing", fmt.Sprintf("as in `%s bolts from bolts.csv`", kind))
	case t.Name == nil && b.Kind == CasesBlock:
		at := p.span(seg.Start, seg.Start)
		t.Name = &Name{At: at, ID: "cases", Text: "cases", Slot: -1}
	case t.Name == nil && len(p.diags) == 0:
		p.report(diag.Error, p.span(seg.Start, seg.Start), diag.Syntax, "the schedule has no name", "put it behind the word, as in `schedule bolts`")
	}
}

// table reads the header and the rows in the lines.
func (p *parser) table(t *Table) {
	leading, rule := false, false
	for _, line := range p.lines {
		l := trimmed(p.s, line.Start, line.End)
		if l.Start == l.End || p.isRemark(line) {
			continue
		}
		if t.From != "" {
			p.report(diag.Error, p.span(l.Start, l.End), diag.Syntax, fmt.Sprintf("the rows of this table stand in %s", quoted(t.From)),
				"leave the lines out, or `from` and the file")
			return
		}
		switch {
		case t.Columns == nil:
			leading = p.s[l.Start] == '|'
			p.header(t, l)
			rule = true
		case rule && isRule(p.s[l.Start:l.End]):
			rule = false
		default:
			rule = false
			p.row(t, l, leading)
		}
	}
	if t.Columns == nil && t.From == "" && len(p.diags) == 0 {
		p.report(diag.Error, t.At, diag.Syntax, "the table has no header", "its first line names the columns, as in `mark | x [mm] | y [mm]`")
	}
	if n := len(t.Columns); n > 0 && len(t.Rows) == 0 && len(p.diags) == 0 {
		p.report(diag.Error, t.Columns[0].At.To(t.Columns[n-1].At), diag.Syntax, "the table has no rows below its header")
	}
}

// cells splits a line at its pipes; `\|` is none, nor is one in quotes.
func (p *parser) cells(l Line) []Line {
	cells := make([]Line, 0, 8)
	start := l.Start
	for i := l.Start; i < l.End; i++ {
		switch p.s[i] {
		case '\\':
			if i+1 < l.End && p.s[i+1] == '|' {
				i++
			}
		case '"':
			if blanksEnd(p.s, start) == i {
				if n := strings.IndexByte(p.s[i+1:l.End], '"'); n >= 0 {
					i += n + 1
				}
			}
		case '|':
			cells = append(cells, trimmed(p.s, start, i))
			start = i + 1
		}
	}
	return append(cells, trimmed(p.s, start, l.End))
}

func isRule(s string) bool {
	return strings.Trim(s, "|-: \t") == "" && strings.Contains(s, "-")
}

func (p *parser) header(t *Table, l Line) {
	cells := p.cells(l)
	if len(cells) > 1 && p.s[l.Start] == '|' {
		cells = cells[1:]
	}
	if last := cells[len(cells)-1]; len(cells) > 1 && last.Start == last.End && p.s[l.End-1] == '|' {
		cells = cells[:len(cells)-1]
	}
	t.Columns = make([]Column, len(cells))
	for i, c := range cells {
		t.Columns[i] = p.column(c)
	}
}

// column reads one cell of a header. Its Name is nil after a mistake.
func (p *parser) column(c Line) Column {
	col := Column{At: p.span(c.Start, c.End)}
	if c.Start == c.End {
		p.report(diag.Error, col.At, diag.Syntax, "a column has no name")
		return col
	}
	p.whole(c.Start, c.End)
	name := p.plainName("a column's name")
	if name != nil && p.tok == tOpenUnit {
		col.Unit = p.unitRef(unitOnly)
	}
	if name != nil && p.tok != tEnd {
		p.syntax(p.start, p.pos, fmt.Sprintf("a column is headed by a name and its unit, as in `x [mm]`; %s is out of place", quoted(p.here())))
	}
	col.Name, col.Failed = name, p.failed
	return col
}

// row reads one line of cells. A line with too few or too many is reported and
// filled or cut, so that each row has a cell for each column.
func (p *parser) row(t *Table, l Line, leading bool) {
	cells := p.cells(l)
	n := len(t.Columns)
	if p.s[l.Start] == '|' && (leading || len(cells) > n) {
		cells = cells[1:]
	}
	if last := cells[len(cells)-1]; len(cells) == n+1 && last.Start == last.End {
		cells = cells[:n]
	}
	if len(cells) != n {
		p.report(diag.Error, p.span(l.Start, l.End), diag.Syntax, fmt.Sprintf("the row has %s and the header %s", count(len(cells), "cell"), count(n, "column")))
	}
	row := Row{At: p.span(l.Start, l.End), Cells: make([]Cell, n)}
	for i := range row.Cells {
		if i >= len(cells) {
			row.Cells[i] = Cell{At: p.span(l.End, l.End), Missing: true}
			continue
		}
		c := cells[i]
		quoted := c.End-c.Start >= 2 && p.s[c.Start] == '"' && strings.IndexByte(p.s[c.Start+1:c.End], '"') == c.End-c.Start-2
		row.Cells[i] = p.tableCell(c, quoted)
	}
	t.Rows = append(t.Rows, row)
}

func count(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}

// tableCell reads one cell; quoted tells that it is a text in quotes.
func (p *parser) tableCell(c Line, quoted bool) Cell {
	cell := Cell{At: p.span(c.Start, c.End), Quoted: quoted, Text: p.s[c.Start:c.End]}
	if quoted {
		if strings.HasPrefix(cell.Text, `"`) && len(cell.Text) >= 2 {
			cell.Text = cell.Text[1 : len(cell.Text)-1]
		}
		cell.Expr = &Text{At: cell.At, Value: cell.Text}
		return cell
	}
	cell.Text = strings.ReplaceAll(cell.Text, `\|`, "|")
	if c.Start == c.End {
		return cell
	}
	if x := p.plainCell(c); x != nil {
		cell.Expr = x
		return cell
	}
	before := len(p.diags)
	p.slots, p.cell = 0, true
	p.whole(c.Start, c.End)
	x := p.value()
	p.finish()
	p.cell = false
	if len(p.diags) > before {
		d := p.diags[len(p.diags)-1]
		cell.Err = &d
		p.diags = p.diags[:before]
	}
	if !p.failed {
		cell.Expr, cell.Slots = x, p.slots
	}
	return cell
}

// plainCell reads a cell of plain digits, with a sign or a point, which most
// are. It returns nil for all others.
func (p *parser) plainCell(c Line) Expr {
	i := c.Start
	if p.s[i] == '-' {
		i++
	}
	if c.End-i > 15 {
		return nil
	}
	point := false
	for j := i; j < c.End; j++ {
		if p.s[j] == '.' && !point && j+1 < c.End {
			point = true
		} else if !isDigit(p.s[j]) {
			return nil
		}
	}
	if i == c.End {
		return nil
	}
	n := p.numbers.One(p.size)
	n.At, n.Pieces = p.span(i, c.End), p.pieces.Take(1, p.size)
	n.Pieces[0] = Piece{Figures: p.s[i:c.End], At: n.At}
	if i > c.Start {
		return p.unary(Neg, c.Start, n)
	}
	return n
}

// ParseHeaderCell reads one cell of a header, `x [mm]`. Its Name is nil where
// it cannot be read.
func ParseHeaderCell(src *diag.Source, at diag.Span) (Column, *diag.Diagnostic) {
	p := newParser(src, at, newSlabs(at.End-at.Start))
	col := p.column(trimmed(p.s, 0, len(p.s)))
	if len(p.diags) > 0 {
		return col, &p.diags[0]
	}
	return col, nil
}

// ParseCell reads one cell of a table. quoted tells that its text is one in
// quotes, whether at spans them or not.
func ParseCell(src *diag.Source, at diag.Span, quoted bool) Cell {
	p := newParser(src, at, newSlabs(at.End-at.Start))
	return p.tableCell(trimmed(p.s, 0, len(p.s)), quoted)
}
