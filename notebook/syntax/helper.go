package syntax

import (
	"fmt"

	"gusset/notebook/diag"
)

// helper reads the lines of a helper block: its parameters, then formulas
// and limits, and what it gives.
func (p *parser) helper(h *Helper) {
	leading := true // still among the parameters
	for p.next < len(p.lines) {
		if leading && p.parameterLine() {
			if param, ok := p.parameter(); ok {
				h.Params = append(h.Params, param)
			} else {
				h.Stmts = append(h.Stmts, p.badStatement(param.Name))
			}
			continue
		}
		before := len(h.Stmts)
		h.Stmts = p.appendStatement(h.Stmts)
		if len(h.Stmts) == before {
			continue
		}
		switch s := h.Stmts[before].(type) {
		case *Gap, *NoteLine:
		case *Gives:
			leading = false
			h.Stmts = h.Stmts[:before]
			if h.Gives != nil {
				p.report(diag.Error, s.At, diag.Syntax, "a helper has one `gives`, which names all its results")
				continue
			}
			h.Gives = s.Names
		case *Check:
			leading = false
			h.Stmts[before] = &BadStmt{At: s.At}
			at := diag.Span{Start: s.At.Start, End: s.At.Start + len("check")}
			p.report(diag.Error, at, diag.Syntax, "a helper has limits of validity and no checks", "write `needs`")
		default:
			leading = false
		}
	}
	h.Stmts = dropLastGap(h.Stmts)
}

// parameterLine tells whether the statement at the next line may be a
// parameter: a name with nothing behind it, or with a literal.
func (p *parser) parameterLine() bool {
	line := p.lines[p.next]
	l := trimmed(p.s, line.Start, line.End)
	s := p.s[l.Start:l.End]
	end := nameEnd(s, 0, len(s))
	if end == 0 || IsReserved(s[:end]) {
		return false
	}
	i := blanksEnd(s, end)
	for i < len(s) && s[i] == '[' {
		for i < len(s) && s[i] != ']' {
			i++
		}
		i = blanksEnd(s, min(i+1, len(s)))
	}
	if i >= len(s) || s[i] == '#' {
		return true
	}
	if s[i] != '=' {
		return false
	}
	next, diags := p.next, len(p.diags)
	p.readStatement()
	p.begin()
	p.tok, p.pos = tEnd, l.Start+i
	p.advance() // the `=`
	p.advance()
	if p.tok == tMinus || p.tok == tPlus {
		p.advance()
	}
	literal := p.tok == tNumber || p.tok == tText
	if literal {
		p.primary()
		literal = p.tok == tEnd || p.tok == tFailed
	}
	p.next, p.diags = next, p.diags[:diags]
	return literal
}

// parameter reads `V [force]`, `n = 1` or `g [length] = 0`; ok is false after
// a mistake.
func (p *parser) parameter() (param *Param, ok bool) {
	p.slots = 0
	p.readStatement()
	p.begin()
	param = &Param{At: p.bounds(), Note: p.note, Name: p.name()}
	if p.tok == tOpenUnit {
		if param.Unit = p.unitRef(parameterType); param.Unit == nil {
			return param, false
		}
	}
	if p.tok == tAssign {
		p.advance()
		param.Default = p.value()
	} else if param.Unit == nil && p.tok == tEnd {
		p.fail(param.At, diag.Syntax, fmt.Sprintf("the parameter %s needs its quantity or unit in brackets", quoted(param.Name.Text)),
			"as in "+quoted(param.Name.Text+" [length]"))
	}
	p.finish()
	return param, !p.failed
}

// needs reads `needs condition`, with `else warn` where a call outside is only
// to be warned of.
func (p *parser) needs() Stmt {
	n := &Needs{Note: p.note}
	p.advance()
	n.Cond = p.condition()
	if p.tok == tElse {
		p.advance()
		if p.tok != tWarn {
			p.syntax(p.lastFrom, p.last, "behind `else` stands `warn`", "write `else warn`")
		}
		n.Warn = true
		p.advance()
	}
	if p.finish(); p.failed {
		return p.badStatement(nil)
	}
	n.At, n.Slots = p.bounds(), p.slots
	return n
}

// gives reads `gives tau, A`.
func (p *parser) gives() Stmt {
	g := &Gives{}
	start, end := p.start, p.pos
	p.advance()
	for {
		if p.tok != tName || p.dots {
			p.syntax(start, end, "behind `gives` stand the names of the results, as in `gives tau, A`")
			return p.badStatement(nil)
		}
		name := p.name()
		for _, other := range g.Names {
			if other.ID == name.ID {
				p.fail(name.At, diag.Syntax, fmt.Sprintf("%s is given twice", quoted(name.Text)))
				return p.badStatement(nil)
			}
		}
		g.Names = append(g.Names, name)
		if p.tok != tComma {
			break
		}
		p.advance()
	}
	if p.finish(); p.failed {
		return p.badStatement(nil)
	}
	g.At = p.bounds()
	return g
}
