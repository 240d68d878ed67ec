package syntax

import (
	"fmt"
	"reflect"
	"strings"
	"testing"
	"unicode/utf8"

	"pgregory.net/rapid"

	"gusset/notebook/diag"
)

// checkTree holds a tree to what later phases rely on: every node lies within
// its parent, and every slot below the count of slots.
type treeChecker struct {
	src   *diag.Source
	slots int
	fault string
}

func (c *treeChecker) say(format string, args ...any) {
	if c.fault == "" {
		c.fault = fmt.Sprintf(format, args...)
	}
}

func (c *treeChecker) within(at, parent diag.Span, what any) {
	if at.Start > at.End || at.Start < parent.Start || at.End > parent.End {
		c.say("%T at %v does not lie within %v", what, at, parent)
	}
	if !utf8.ValidString(c.src.Slice(at)) {
		c.say("%T at %v cuts a character", what, at)
	}
}

// expr checks one expression below a parent, by reflection over its fields, so
// that a new kind of node is checked too.
func (c *treeChecker) expr(e Expr, parent diag.Span) {
	if e == nil || reflect.ValueOf(e).IsNil() {
		c.say("a node is missing in %v", parent)
		return
	}
	c.within(e.Span(), parent, e)
	if n, ok := e.(*Name); ok && (n.Slot < 0 || n.Slot >= c.slots) {
		c.say("the name %s has slot %d of %d", n.ID, n.Slot, c.slots)
	}
	if n, ok := e.(*Number); ok {
		for _, p := range n.Pieces {
			c.within(p.At, n.At, p)
			if p.HasUnit {
				c.within(p.UnitAt, n.At, p)
			}
			if _, err := p.Rat(); err != nil {
				c.say("figures %q: %v", p.Figures, err)
			}
		}
	}
	if _, ok := e.(*Bad); ok {
		c.say("a bad node in a statement without mistakes")
	}
	first := true
	Walk(e, func(x Expr) bool {
		if first {
			first = false
			return true
		}
		c.expr(x, e.Span())
		return false
	})
}

func (c *treeChecker) statements(stmts []Stmt, at diag.Span) {
	for _, s := range stmts {
		c.within(s.Span(), at, s)
		switch s := s.(type) {
		case *Definition:
			c.slots = s.Slots
			c.within(s.Name.At, s.At, s.Name)
			if len(s.Branches) == 0 {
				c.say("%s has no branch", s.Name.ID)
			}
			for _, b := range s.Branches {
				c.within(b.At, s.At, b)
				c.expr(b.Value, b.At)
				if b.Cond != nil {
					c.expr(b.Cond, b.At)
				}
			}
		case *Check:
			c.slots = s.Slots
			c.expr(s.Cond, s.At)
			if s.If != nil {
				c.expr(s.If, s.At)
			}
		case *Needs:
			c.slots = s.Slots
			c.expr(s.Cond, s.At)
		}
	}
}

func (c *treeChecker) block(b *Block) {
	c.statements(b.Stmts, b.At)
	switch {
	case b.Helper != nil:
		c.statements(b.Helper.Stmts, b.At)
		for _, p := range b.Helper.Params {
			c.within(p.At, b.At, p)
			c.slots = 0
			if p.Default != nil {
				c.expr(p.Default, p.At)
			}
		}
	case b.Table != nil:
		for _, r := range b.Table.Rows {
			if len(r.Cells) != len(b.Table.Columns) {
				c.say("a row of %d cells under %d columns", len(r.Cells), len(b.Table.Columns))
			}
			for _, cell := range r.Cells {
				c.within(cell.At, b.At, cell)
				c.slots = cell.Slots
				if cell.Expr != nil {
					c.expr(cell.Expr, cell.At)
				} else if cell.Text != "" && cell.Err == nil {
					c.say("the cell %q has neither a tree nor a reason", cell.Text)
				}
			}
		}
	case b.Figure != nil:
		c.slots = b.Figure.Slots
		for _, a := range b.Figure.Args {
			c.expr(a.Value, b.At)
		}
	case b.Plot != nil:
		c.slots = b.Plot.Slots
		for _, n := range b.Plot.Curves {
			c.expr(n, b.At)
		}
	}
}

func checkBlock(src *diag.Source, b *Block, diags []diag.Diagnostic) string {
	c := treeChecker{src: src}
	whole := diag.Span{Start: 0, End: len(src.Text)}
	for _, d := range diags {
		c.within(d.Span, whole, d)
		_ = d.Text()
		if d.Message == "" || !utf8.ValidString(d.Message) {
			c.say("message %q", d.Message)
		}
	}
	c.block(b)
	return c.fault
}

func FuzzParseBlock(f *testing.F) {
	for _, t := range blockTests {
		f.Add(t.info, t.content)
	}
	for _, t := range mistakes {
		f.Add("calc", t.source+"\ny = 3\n")
	}
	for _, t := range fenceMistakes {
		f.Add(t.info, t.content)
	}
	f.Fuzz(func(t *testing.T, info, content string) {
		if !utf8.ValidString(info) || !utf8.ValidString(content) {
			t.Skip("a source is valid UTF-8")
		}
		for i := range len(info) {
			if info[i] == '\n' {
				t.Skip("an info string is one line")
			}
		}
		src, parse := fenced(info, content)
		b, diags := parse()
		if b == nil {
			t.Fatal("no tree")
		}
		if fault := checkBlock(src, b, diags); fault != "" {
			t.Fatal(fault)
		}
	})
}

func FuzzParseExpr(f *testing.F) {
	for _, t := range exprTests {
		f.Add(t.source)
	}
	f.Fuzz(func(t *testing.T, s string) {
		if !utf8.ValidString(s) {
			t.Skip("a source is valid UTF-8")
		}
		src := diag.NewSource("x.md", []byte(s))
		at := diag.Span{Start: 0, End: len(src.Text)}
		e, diags := ParseExpr(src, at)
		if e == nil {
			t.Fatal("no tree")
		}
		c := treeChecker{src: src, slots: 1 << 20}
		for _, d := range diags {
			c.within(d.Span, at, d)
			_ = d.Text()
		}
		if !diag.HasErrors(diags) {
			c.expr(e, at)
			if again := Print(src, e); again != "" {
				reparsed := diag.NewSource("y.md", []byte(again))
				e2, diags := ParseExpr(reparsed, diag.Span{Start: 0, End: len(reparsed.Text)})
				if diag.HasErrors(diags) || DumpExpr(e2) != DumpExpr(e) {
					c.say("printed as %q it reads as %s, not %s", again, DumpExpr(e2), DumpExpr(e))
				}
			}
		}
		if c.fault != "" {
			t.Fatal(c.fault)
		}
		ParseValueRef(src, at)
		ParseCell(src, at, false)
		ParseHeaderCell(src, at)
	})
}

// vocabulary is what statements are made of; random runs of it reach states of
// the parser that random bytes do not.
var vocabulary = strings.Split(`a|τ_d|bolts.x|f|max|mm|kN|d|1|2.5|3/4|1 1/8|12 ft|6 in|1,200|1e400|5 kips|2x|-40 degC|"text"|"open|+|-|*|/|^|²|√|<|<=|==|!=|(|)|(|)|[mm]|[force]|[column of length]|[|]|,|=|=|if|otherwise|else|and|or|not|at|over|first of|with|where|check|needs|gives|warn|# note [src]|//|@|'|12'-6"|from|to|against|limit|steps|title||-|\|`, "|")

func TestRandomStatements(t *testing.T) {
	kinds := []string{"calc", "helper h", "schedule s", "plot", "figure mohr", "cases"}
	rapid.Check(t, func(t *rapid.T) {
		words := rapid.SliceOfN(rapid.SampledFrom(append(vocabulary, "\n", "\n", "\nx = ", "\ncheck ", "\n= ", "|")), 1, 40).Draw(t, "words")
		info := rapid.SampledFrom(kinds).Draw(t, "info")
		content := strings.Join(words, rapid.SampledFrom([]string{" ", "", "  "}).Draw(t, "blank"))
		src, parse := fenced(info, content)
		b, diags := parse()
		if fault := checkBlock(src, b, diags); fault != "" {
			t.Fatal(fault)
		}
		bad := 0
		for _, s := range b.Stmts {
			if _, ok := s.(*BadStmt); ok {
				bad++
			}
		}
		if b.Kind == CalcBlock && (bad > 0) != diag.HasErrors(diags) {
			t.Fatalf("%d bad statements, diagnostics %v", bad, diags)
		}
	})
}
