package check

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"maps"
	"slices"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// readCSV reads the file that a schedule names. Comment lines starting with
// `#` may stand above its header; faults point into the file itself.
func (c *checker) readCSV(t *syntax.Table) (*syntax.Table, *diag.Source, bool) {
	src, bad := c.csvSource(t.From)
	if bad != nil {
		bad.Source, bad.Span = c.in.Source, t.FromAt
		c.report(*bad)
		return t, nil, false
	}
	out := &syntax.Table{At: diag.Span{Start: 0, End: len(src.Text)}, Name: t.Name, From: t.From, FromAt: t.FromAt}
	start := skipComments(src.Text)
	r := csv.NewReader(bytes.NewReader(src.Text[start:]))
	r.FieldsPerRecord = -1
	r.TrimLeadingSpace = true
	f := &csvFile{l: &lower{e: &env{c: c, src: src, scope: c.top.scope, names: map[string]*Def{}, parent: c.top}}, src: src, r: r, first: src.LineAt(start) - 1}
	ok := f.read(out)
	if len(out.Columns) == 0 && ok {
		f.l.fail(diag.Syntax, diag.Span{Start: 0, End: 0}, "the file has no header", "the first line names the columns, with units: `mark,x [mm],y [mm]`")
		ok = false
	}
	if n := len(out.Columns); n > 0 && len(out.Rows) == 0 && !f.l.failed {
		f.l.fail(diag.Syntax, out.Columns[0].At.To(out.Columns[n-1].At), "the file has no rows below its header")
		ok = false
	}
	return out, src, ok
}

// libraryPrefix starts the names of the tables that ship with the program.
const libraryPrefix = "library/"

// csvSource finds the file, or says why it cannot be had.
func (c *checker) csvSource(path string) (*diag.Source, *diag.Diagnostic) {
	if !strings.HasPrefix(path, libraryPrefix) {
		return c.in.ReadTable(path)
	}
	if s, ok := c.in.Library.Tables[path]; ok {
		return s, nil
	}
	tables := slices.Sorted(maps.Keys(c.in.Library.Tables))
	hint := "its tables are " + strings.Join(tables, ", ")
	if near := diag.Nearest(path, tables); near != "" {
		hint = fmt.Sprintf("did you mean `%s`?", near)
	}
	return nil, &diag.Diagnostic{ID: diag.MissingFile, Message: fmt.Sprintf("the library that ships with the program has no table `%s`", path), Hints: []string{hint}}
}

func skipComments(text []byte) int {
	at := 0
	for at < len(text) && text[at] == '#' {
		end := bytes.IndexByte(text[at:], '\n')
		if end < 0 {
			return len(text)
		}
		at += end + 1
	}
	return at
}

// csvFile reads records to a table, keeping where each field stands.
type csvFile struct {
	l     *lower
	src   *diag.Source
	r     *csv.Reader
	first int // lines above the header
}

func (f *csvFile) read(t *syntax.Table) bool {
	ok := true
	for {
		record, err := f.r.Read()
		if err == io.EOF {
			return ok
		}
		if err != nil {
			f.broken(err)
			return false
		}
		switch {
		case t.Columns == nil:
			if ok = f.header(t, record); t.Columns == nil {
				return false
			}
		case len(t.Rows) > maxRows:
			return ok // the bound is reported once for the table
		default:
			f.row(t, record)
		}
	}
}

// broken reports a record that is no CSV, at its line.
func (f *csvFile) broken(err error) {
	var pe *csv.ParseError
	line, message := 1, err.Error()
	if errors.As(err, &pe) {
		line, message = pe.Line+f.first, pe.Err.Error()
		switch pe.Err {
		case csv.ErrQuote:
			message = "the quotes of a field are not closed, or a quote inside them is not doubled"
		case csv.ErrBareQuote:
			message = "a quote stands in a field that does not begin with one"
		}
	}
	start, text := f.src.LineStart(line), f.src.Line(line)
	at := diag.Span{Start: start, End: start + len(text)}
	if i := strings.IndexAny(text, ",;\t"); i >= 0 && text[i] != ',' {
		f.separators(at)
		return
	}
	f.l.fail(diag.Syntax, at, message, "a field with a comma or a quote stands in quotes, and a quote inside is doubled")
}

// separators reports a file whose columns are parted by semicolons or tabs, as
// office programs write them where the comma is the decimal mark.
func (f *csvFile) separators(at diag.Span) {
	f.l.fail(diag.Syntax, at, "the columns are separated by commas", "save the file with commas as separators and points as decimal marks")
}

// field returns where a field's text stands, and whether it is quoted.
func (f *csvFile) field(i int, text string) (diag.Span, bool) {
	line, column := f.r.FieldPos(i)
	start := f.src.LineStart(line+f.first) + column - 1
	quoted := start < len(f.src.Text) && f.src.Text[start] == '"'
	if quoted {
		start++
	}
	return diag.Span{Start: start, End: min(start+len(text), len(f.src.Text))}, quoted
}

func (f *csvFile) header(t *syntax.Table, record []string) bool {
	ok := true
	for i, text := range record {
		at, _ := f.field(i, text)
		if len(record) == 1 && bytes.ContainsAny([]byte(text), ";\t") {
			f.separators(at)
			return false
		}
		col, d := syntax.ParseHeaderCell(f.src, at)
		if d != nil {
			d.Source = f.src
			f.l.e.c.report(*d)
			ok = false
		}
		t.Columns = append(t.Columns, col)
	}
	return ok
}

// row enters a record. One with too few fields or too many is reported and
// filled or cut, as a row in the calc file is.
func (f *csvFile) row(t *syntax.Table, record []string) {
	line, _ := f.r.FieldPos(0)
	start := f.src.LineStart(line + f.first)
	at := diag.Span{Start: start, End: start + len(f.src.Line(line+f.first))}
	row := syntax.Row{At: at}
	if len(record) != len(t.Columns) {
		f.l.fail(diag.Syntax, at, fmt.Sprintf("the row has %s, but the header has %d", count(len(record), "field", "fields"), len(t.Columns)))
	}
	for i := range t.Columns {
		if i >= len(record) {
			row.Cells = append(row.Cells, syntax.Cell{At: diag.Span{Start: at.End, End: at.End}, Missing: true})
			continue
		}
		text := record[i]
		where, quoted := f.field(i, text)
		cell := syntax.ParseCell(f.src, where, false)
		// Quotes are the file's, not the calc's: "10" is a number like 10. Only a
		// mark, and what is no number in a column without a unit, is a text by them.
		if quoted && (i == 0 || t.Columns[i].Unit == nil && (cell.Expr == nil || !literal(cell.Expr))) {
			cell = syntax.ParseCell(f.src, where, true)
			cell.Text = text // a doubled quote inside stands for one
		}
		row.Cells = append(row.Cells, cell)
	}
	t.Rows = append(t.Rows, row)
}
