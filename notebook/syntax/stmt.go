package syntax

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/units"
)

// statements reads the lines of a calc block.
func (p *parser) statements() []Stmt {
	stmts := make([]Stmt, 0, len(p.lines))
	for p.next < len(p.lines) {
		stmts = p.appendStatement(stmts)
	}
	return dropLastGap(stmts)
}

// appendStatement reads what stands at line p.next. Blank lines at the start
// leave no gap, several in a row leave one.
func (p *parser) appendStatement(stmts []Stmt) []Stmt {
	line := p.lines[p.next]
	l := trimmed(p.s, line.Start, line.End)
	switch {
	case l.Start == l.End:
		p.next++
		if n := len(stmts); n > 0 {
			if _, gap := stmts[n-1].(*Gap); !gap {
				stmts = append(stmts, &Gap{At: p.span(line.Start, line.End)})
			}
		}
		return stmts
	case strings.HasPrefix(p.s[l.Start:l.End], "//"):
		p.next++
		return stmts
	case p.s[l.Start] == '#':
		p.next++
		note := p.noteAt(l.Start, l.End)
		return append(stmts, &NoteLine{At: note.At, Note: note})
	}
	p.slots = 0
	p.readStatement()
	p.begin()
	return append(stmts, p.statement())
}

func dropLastGap(stmts []Stmt) []Stmt {
	if n := len(stmts); n > 0 {
		if _, gap := stmts[n-1].(*Gap); gap {
			return stmts[:n-1]
		}
	}
	return stmts
}

// statement reads the statement in segs, with the branches in the lines below.
func (p *parser) statement() Stmt {
	if p.assignFollows() && p.tok != tName {
		name := p.here()
		p.syntax(p.start, p.pos, fmt.Sprintf("%s is a word of the notation and cannot be a name", quoted(name)))
		return p.badStatement(nil)
	}
	switch p.tok {
	case tName:
		return p.definition()
	case tCheck:
		return p.check()
	case tNeeds:
		if p.kind == HelperBlock {
			return p.needs()
		}
		p.syntax(p.start, p.pos, "`needs` stands in a helper; in a calc a condition is checked by `check`", "write `check`")
	case tGives:
		if p.kind == HelperBlock {
			return p.gives()
		}
		p.syntax(p.start, p.pos, "`gives` stands in a helper only")
	case tAssign:
		p.syntax(p.start, p.pos, "a line that starts with `=` goes on with the definition above, and there is none")
	case tIf, tOtherwise, tElse, tWhere:
		p.syntax(p.start, p.pos, fmt.Sprintf("%s belongs to a definition; put it behind its formula", quoted(p.here())))
	case tFailed:
	default:
		p.noStatement()
	}
	return p.badStatement(nil)
}

// noStatement reports a line that starts as no statement does.
func (p *parser) noStatement() {
	here := quoted(p.here())
	switch {
	case p.tok >= tIf:
		p.syntax(p.start, p.pos, fmt.Sprintf("%s is a word of the notation and cannot be a name", here))
	case levels[p.tok] > 0 || p.tok == tComma:
		p.syntax(p.start, p.pos, fmt.Sprintf("a line does not start with %s", here),
			"a statement goes on in the next line where the line above ends in an operator or a comma")
	case p.tok == tNumber:
		p.syntax(p.start, p.operandEnd(p.start), fmt.Sprintf("a name starts with a letter, not with %s", here))
	default:
		p.syntax(p.start, p.pos, fmt.Sprintf("a line defines a name, as in `A = pi*d^2/4`, or checks, as in `check tau <= tau_d`; it does not start with %s", here))
	}
}

// badStatement stands for the statement in segs; what it was about to define
// keeps its name. Branches below go with it.
func (p *parser) badStatement(name *Name) Stmt {
	at := p.bounds()
	if p.tok == tFailed {
		at = p.skipBranches(at)
	}
	return &BadStmt{At: at, Name: name}
}

// definition reads `name [unit] = …` or `name(…) [unit] = …`.
func (p *parser) definition() Stmt {
	dots := p.dots
	name := p.name()
	if dots {
		p.fail(name.At, diag.Syntax, fmt.Sprintf("a name that is defined has no dots, unlike %s", quoted(name.Text)))
		return p.badStatement(name)
	}
	def := p.defs.One(p.size)
	def.Name = name
	if p.tok == tOpen && !p.parameters(def) {
		return p.badStatement(name)
	}
	if p.tok == tOpenUnit {
		if def.Unit = p.unitRef(unitOrQuantity); def.Unit == nil {
			return p.badStatement(name)
		}
	}
	if p.tok != tAssign {
		p.noAssign(def)
		return p.badStatement(name)
	}
	p.advance()
	stmt := p.rightSide(def)
	if _, ok := stmt.(*Definition); ok && p.unitForParameter(def) {
		return &BadStmt{At: def.At, Name: name}
	}
	return stmt
}

// noAssign reports what stands in the place of `=`.
func (p *parser) noAssign(def *Definition) {
	start := def.Name.At.Start - p.off
	whole := p.s[start:p.segs[len(p.segs)-1].End]
	switch {
	case def.Name.Text != "check" && strings.EqualFold(def.Name.Text, "check") && p.tok != tEnd && !def.Func && def.Unit == nil:
		p.fail(def.Name.At, diag.Syntax, "`check` is written in small letters", "write `check`")
	case p.tok == tEq && len(p.segs) == 1:
		p.syntax(p.start, p.pos, "`==` compares; a name is defined with `=`", "write `=`")
	case levels[p.tok] == levelCompare && len(p.segs) == 1:
		p.syntax(start, p.end, "a comparison stands behind `check`", "write "+quoted("check "+whole))
	case p.tok == tName && units.IsUnitName(p.here()) && def.Unit == nil:
		e := p.unitRunEnd(p.start)
		p.syntax(p.start, e, "the unit that a value is declared in stands in square brackets", "write "+quoted("["+p.s[p.start:e]+"]"))
	case p.tok == tEnd && def.Unit != nil && p.kind == HelperBlock && !def.Func:
		p.syntax(start, p.end, fmt.Sprintf("%s has no value; parameters stand above the first formula", quoted(def.Name.Text)))
	case p.tok == tEnd && def.Unit != nil:
		p.syntax(start, p.end, fmt.Sprintf("the value of %s is missing: a line is `name [unit] = value`", quoted(def.Name.Text)))
	case p.tok == tEnd:
		p.syntax(start, p.end, fmt.Sprintf("%s alone says nothing: a line defines a name, as in `A = pi*d^2/4`, or checks, as in `check tau <= tau_d`", quoted(whole)))
	case p.tok == tFailed:
	default:
		p.syntax(p.start, p.pos, fmt.Sprintf("`=` is missing between %s and %s", quoted(def.Name.Text), quoted(p.here())),
			"a line defines a name, as in `A = pi*d^2/4`, or checks, as in `check tau <= tau_d`")
	}
}

// unitRunEnd returns the end of a unit written without blanks from i on.
func (p *parser) unitRunEnd(i int) int {
	for i < p.end && !strings.ContainsRune(" \t=[],#", rune(p.s[i])) {
		i++
	}
	return i
}

// parameters reads `(F, d, t)` behind the name of a function.
func (p *parser) parameters(def *Definition) bool {
	open := p.start
	def.Func = true
	p.advance()
	for p.tok != tClose || len(def.Params) > 0 {
		if p.tok != tName || p.dots {
			switch {
			case p.tok == tEnd:
				p.syntax(open, open+1, "the bracket `(` is not closed")
			case p.tok >= tIf:
				p.syntax(p.start, p.pos, fmt.Sprintf("%s is a word of the notation and cannot be a name", quoted(p.here())))
			default:
				p.syntax(p.start, p.pos, fmt.Sprintf("the brackets behind %s hold the names of its parameters, not %s", quoted(def.Name.Text), quoted(p.here())))
			}
			return false
		}
		param := p.name()
		for _, other := range def.Params {
			if other.ID == param.ID {
				p.fail(param.At, diag.Redefined, fmt.Sprintf("the parameter %s is named twice", quoted(param.Text)))
				return false
			}
		}
		def.Params = append(def.Params, param)
		if p.tok != tComma {
			break
		}
		p.advance()
	}
	if p.tok == tOpenUnit {
		p.syntax(p.start, p.pos, "a parameter has no unit; dimensions are checked at each use of the function")
		return false
	}
	if p.tok != tClose && p.tok != tEnd && p.tok != tFailed {
		p.syntax(p.start, p.pos, fmt.Sprintf("the brackets behind %s hold the names of its parameters, parted by commas; %s is out of place", quoted(def.Name.Text), quoted(p.here())))
		return false
	}
	_, ok := p.closing(open)
	return ok
}

// unitForParameter reports `x (mm) = 3`, which would define a function of mm.
func (p *parser) unitForParameter(def *Definition) bool {
	if len(def.Params) != 1 || !units.IsUnitName(def.Params[0].Text) {
		return false
	}
	at := def.Params[0].At
	used, called := false, def.Name.At.End+1 == at.Start // `x (mm)` has a blank, `f(d)` has none
	for _, b := range def.Branches {
		for _, e := range []Expr{b.Value, b.Cond} {
			Walk(e, func(x Expr) bool {
				switch x := x.(type) {
				case *Name:
					used = used || x.ID == def.Params[0].ID
				case *Number:
					used = used || called && eitherWay(x, def.Params[0].ID)
				}
				return !used
			})
		}
	}
	if used {
		return false
	}
	p.tok = tEnd
	p.fail(diag.Span{Start: at.Start - 1, End: at.End + 1}, diag.Syntax,
		"round brackets behind a name hold parameters; a declared unit stands in square ones", "write "+quoted("["+def.Params[0].Text+"]"))
	return true
}

// eitherWay tells whether a name stands in a literal where it may be a value as
// well as a unit, as d does in `2d` and `48 kN/d`; the checker tells of that.
func eitherWay(x *Number, id string) bool {
	for _, p := range x.Pieces {
		for i, at := range p.Unit.Names() {
			if Canonical(at.Name) == id && (i == 0 && p.Touch || at.After != "") {
				return true
			}
		}
	}
	return false
}

// check reads `check condition if condition`.
func (p *parser) check() Stmt {
	c := &Check{Note: p.note}
	p.advance()
	x := p.expression(levelOr)
	if p.tok == tAssign {
		if n, ok := x.(*Name); ok {
			p.syntax(p.start, p.pos, fmt.Sprintf("a check compares; %s is compared with `==`", quoted(n.Text)), "write `==`")
		} else {
			p.syntax(p.start, p.pos, "a check compares with `==`", "write `==`")
		}
	}
	if p.tok == tOpenUnit {
		p.strayBrackets()
	}
	p.needComparison(x)
	c.Cond = x
	if p.tok == tIf {
		p.advance()
		c.If = p.condition()
	}
	if p.finish(); p.failed {
		return p.badStatement(nil)
	}
	c.At, c.Slots = p.bounds(), p.slots
	return c
}

// needComparison holds a check to one comparison or one chain of them.
func (p *parser) needComparison(x Expr) {
	if p.tok == tFailed {
		return
	}
	bare := x
	for {
		b, ok := bare.(*Paren)
		if !ok {
			break
		}
		bare = b.X
	}
	at := x.Span()
	switch e := bare.(type) {
	case *Bad:
	case *Compare:
		if e.Ops[0] == Ne {
			p.fail(e.OpsAt[0], diag.Syntax, "a check compares with `<`, `<=`, `>`, `>=` or `==`, not with `!=`")
		}
	case *Binary:
		switch e.Op {
		case And:
			p.severalChecks(e)
		case Or:
			p.fail(at, diag.Syntax, "a check is one comparison; `or` gives no utilisation", "compare with the larger of the two capacities, by `max`, or make one check hold `if` a condition does")
		default:
			p.noComparison(at)
		}
	case *Unary:
		if e.Op == Not {
			p.fail(at, diag.Syntax, "a check is one comparison; turn it round instead of `not`")
			return
		}
		p.noComparison(at)
	default:
		p.noComparison(at)
	}
}

// severalChecks reports `check a and b` and shows the checks that it means.
func (p *parser) severalChecks(x *Binary) {
	var parts []string
	var split func(e Expr)
	split = func(e Expr) {
		if b, ok := e.(*Binary); ok && b.Op == And {
			split(b.X)
			split(b.Y)
			return
		}
		parts = append(parts, quoted("check "+Print(p.src, e)))
	}
	split(x)
	number := "two"
	if len(parts) > 2 {
		number = fmt.Sprint(len(parts))
	}
	const most = 5 // a longer list helps nobody
	if len(parts) > most {
		parts = append(parts[:most], "…")
	}
	p.fail(p.bounds(), diag.Syntax, fmt.Sprintf("a check is one comparison, so that it has one utilisation; make it %s checks", number),
		"write on lines of their own "+strings.Join(parts, ", "))
}

func (p *parser) noComparison(at diag.Span) {
	p.fail(at, diag.Syntax, fmt.Sprintf("a check compares two values, and %s is one", quoted(p.src.Slice(at))),
		"compare it by `<`, `<=`, `>`, `>=` or `==`, as in `check tau <= tau_d`")
}

// finish reports what is left of the statement.
func (p *parser) finish() {
	if p.tok != tEnd {
		p.leftover()
	}
}
