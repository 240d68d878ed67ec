package render

import (
	"slices"
	"strings"

	"gusset/notebook"
	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
)

// picks are the rows of tables that a calc looks up by their marks. A table
// that is used in any other way has all of its rows in use.
type picks map[*check.Rows]*picked

type picked struct {
	rows  map[int]bool
	whole bool
}

// libraryTable starts the names of tables that ship with the program. They are
// known, so that paper shows only the rows that were looked up.
const libraryTable = "library/"

func (p picks) of(r *check.Rows) *picked {
	if p[r] == nil {
		p[r] = &picked{rows: map[int]bool{}}
	}
	return p[r]
}

// fromLibrary tells whether a table ships with the program.
func fromLibrary(b *syntax.Block) bool {
	return b.Table != nil && strings.HasPrefix(b.Table.From, libraryTable)
}

// newPicks notes what a calc looks up, if there are tables of the library.
func newPicks(s *notebook.Sheet) picks {
	if !slices.ContainsFunc(s.Blocks, func(b *notebook.Block) bool { return fromLibrary(b.Tree) }) {
		return nil
	}
	p := picks{}
	for _, b := range s.Blocks {
		p.add(b.Steps)
	}
	for _, r := range s.Refs {
		p.whole(r.Step)
	}
	return p
}

// printed are the rows of a table that paper shows, nil for all of them.
func (p picks) printed(b *syntax.Block, r *check.Rows) map[int]bool {
	if !fromLibrary(b) {
		return nil
	}
	used := p[r]
	if used == nil || used.whole || len(used.rows) == 0 {
		return nil
	}
	return used.rows
}

// add notes what steps look up, those of the helpers they call included.
func (p picks) add(steps []*eval.Step) {
	for _, s := range steps {
		for _, e := range expressions(s.Stmt) {
			p.look(s, e)
		}
		for _, call := range s.Calls {
			p.add(call.Steps)
		}
	}
}

func expressions(stmt syntax.Stmt) []syntax.Expr {
	switch stmt := stmt.(type) {
	case *syntax.Definition:
		var list []syntax.Expr
		for _, b := range stmt.Branches {
			list = append(list, b.Value, b.Cond)
		}
		return list
	case *syntax.Check:
		return []syntax.Expr{stmt.Cond, stmt.If}
	case *syntax.Needs:
		return []syntax.Expr{stmt.Cond}
	}
	return nil
}

func (p picks) look(s *eval.Step, e syntax.Expr) {
	syntax.Walk(e, func(e syntax.Expr) bool {
		switch e := e.(type) {
		case *syntax.AtMark:
			if column := usedIn(s, e.X); column != nil {
				for _, r := range column.Value.Type.Rows {
					p.at(s, r, e.Y)
				}
				p.look(s, e.Y)
				return false
			}
		case *syntax.Name:
			p.whole(usedIn(s, e))
		}
		return true
	})
}

// whole notes that a value is used with all of its entries.
func (p picks) whole(s *eval.Step) {
	if s == nil {
		return
	}
	for _, r := range s.Value.Type.Rows {
		p.of(r).whole = true
	}
}

// at notes the rows that have a mark. A mark that is no text of this calc may
// be any.
func (p picks) at(s *eval.Step, r *check.Rows, mark syntax.Expr) {
	var marks []string
	switch e := bare(mark).(type) {
	case *syntax.Text:
		marks = []string{e.Value}
	default:
		if used := usedIn(s, e); used != nil && used.Value.Type.Kind == check.Text {
			marks = used.Value.Text
		}
	}
	to := p.of(r)
	to.whole = to.whole || len(marks) == 0
	for _, m := range marks {
		if i := slices.Index(r.Marks, m); i >= 0 {
			to.rows[i] = true
		}
	}
}

// usedIn is the value that an expression names, nil for any other expression.
func usedIn(s *eval.Step, e syntax.Expr) *eval.Step {
	if n, ok := bare(e).(*syntax.Name); ok && n.Slot >= 0 && n.Slot < len(s.Uses) {
		return s.Uses[n.Slot]
	}
	return nil
}
