package syntax

import (
	"fmt"

	"gusset/notebook/diag"
)

// rightSide reads what stands behind the `=` of a definition, and the branches
// and the `where` in the lines below.
func (p *parser) rightSide(def *Definition) Stmt {
	def.Note = p.note
	from, until := def.Name.At.Start, 0
	bad, last := false, Note{}
	branches := p.branches.Take(1, p.size)
	at := p.bounds()
	for n := 0; ; n++ {
		b := &branches[n]
		p.branch(b, n == 0)
		if p.tok == tWhere {
			p.where(def)
		}
		p.finish()
		b.At.Start, until = at.Start, at.End
		if n == 0 {
			b.At.Start = from
		} else if p.note.isSet() {
			b.Note = p.note
		}
		if b.At.End == 0 {
			b.At.End = until
		}
		bad = bad || p.failed
		if !p.goesOn(tAssign) {
			break
		}
		at = p.bounds()
		if !bad && (branches[n].Cond == nil || len(def.Where) > 0) {
			p.strayBranch(&branches[n], len(def.Where) > 0)
		}
		p.advance()
		branches = append(branches, Branch{})
	}
	if p.goesOn(tWhere) {
		if !bad && len(def.Where) > 0 {
			p.syntax(p.start, p.pos, "a definition has one `where`, behind all its branches")
		}
		until = p.bounds().End
		p.where(def)
		p.finish()
		last = p.note
		bad = bad || p.failed
	}
	def.At = diag.Span{Start: from, End: until}
	def.Branches, def.Slots = branches, p.slots
	if def.firstNote(); !def.Note.isSet() {
		def.Note = last
	}
	if !bad {
		bad = p.checkBranches(def)
	}
	if bad {
		return &BadStmt{At: def.At, Name: def.Name}
	}
	return def
}

// firstNote makes the first note of a definition's lines the definition's.
func (def *Definition) firstNote() {
	for i := range def.Branches {
		if def.Note.isSet() {
			return
		}
		def.Note, def.Branches[i].Note = def.Branches[i].Note, Note{}
	}
}

// goesOn reads the next statement if it starts with the token, blank lines
// and `//` lines before it skipped; else it leaves them for the block.
func (p *parser) goesOn(tok token) bool {
	next := p.next
	for next < len(p.lines) && (p.isBlank(p.lines[next]) || p.isRemark(p.lines[next])) {
		next++
	}
	if next >= len(p.lines) || !p.startsWith(p.lines[next], tok) {
		return false
	}
	p.next = next
	p.readStatement()
	p.begin()
	return true
}

// startsWith tells whether a line's first token is `=` or `where`.
func (p *parser) startsWith(line Line, tok token) bool {
	l := trimmed(p.s, line.Start, line.End)
	s := p.s[l.Start:l.End]
	if tok == tAssign {
		return s[0] == '=' && (len(s) == 1 || s[1] != '=')
	}
	end := nameEnd(s, 0, len(s))
	if s[:end] != "where" {
		return false
	}
	i := blanksEnd(s, end)
	return i >= len(s) || s[i] != '='
}

// strayBranch reports a branch behind one that leaves it nothing to decide.
func (p *parser) strayBranch(before *Branch, where bool) {
	switch {
	case where:
		p.syntax(p.start, p.pos, "a branch stands before `where`, which serves all branches from a line of its own at the end")
	case before.Otherwise:
		p.syntax(p.start, p.pos, "a branch behind `otherwise` is never taken")
	default:
		p.syntax(p.start, p.pos, "a further branch needs a condition on the one above", "put it behind `if`, as in `k = 0.85 if t <= 25 mm`")
	}
}

// branch reads a value with its condition.
func (p *parser) branch(b *Branch, first bool) {
	if p.tok == tFirst {
		b.Value = p.firstOf(first)
		return
	}
	b.Value = p.value()
	switch p.tok {
	case tIf:
		p.advance()
		b.Cond = p.condition()
		if p.tok == tComma || p.tok == tElse && p.pos < p.end {
			p.syntax(p.start, p.pos, "each branch of a choice stands on a line of its own", "the next line starts with `=`, the last one ends with `otherwise`")
			return
		}
	case tOtherwise:
		if first {
			p.syntax(p.start, p.pos, "`otherwise` stands behind the last of several branches, and this is the only one above it")
			return
		}
		b.Otherwise = true
		p.advance()
	}
	b.At.End = p.last + p.off
}

// checkBranches reports what is wrong with a definition's branches together.
func (p *parser) checkBranches(def *Definition) bool {
	last := &def.Branches[len(def.Branches)-1]
	if len(def.Branches) > 1 && last.Cond == nil && !last.Otherwise {
		at := last.Value.Span()
		p.tok = tEnd
		p.fail(at, diag.Syntax, "a branch needs its condition: `if …`, or `otherwise` for the last one", "write "+quoted(p.src.Slice(at)+" otherwise"))
		return true
	}
	if len(def.Where) > 0 && (def.Unit == nil || def.Unit.Quantity != "" && def.Unit.Quantity != "number") {
		p.tok = tEnd
		p.fail(def.Name.At, diag.Syntax, fmt.Sprintf("`where` takes plain numbers, so %s needs the unit that the result is in", quoted(def.Name.Text)),
			"declare it behind the name, as in `M_y [N*mm] = …`, or `[number]`")
		return true
	}
	return false
}

// firstOf reads `first of v1, v2, … with condition`.
func (p *parser) firstOf(first bool) Expr {
	start := p.start
	if !first {
		p.syntax(p.start, p.pos, "`first of` is the whole right side of a definition and no branch")
		return p.bad()
	}
	p.advance()
	if p.tok != tOf {
		p.syntax(start, p.last, "`first` belongs to `first of … with …` and cannot be a name")
		return p.bad()
	}
	p.advance()
	f := &FirstOf{}
	for {
		f.Values = append(f.Values, p.value())
		if p.tok != tComma {
			break
		}
		p.advance()
	}
	if p.tok != tWith {
		if p.tok != tEnd {
			p.leftover()
		}
		p.syntax(start, p.last, "`first of` needs the condition that decides, behind `with`",
			"as in `t = first of 6 mm, 8 mm with P/(2*b*t) <= tau_d`")
		return p.bad()
	}
	p.advance()
	f.Cond = p.condition()
	f.At = p.span(start, p.last)
	if p.tok == tIf || p.tok == tOtherwise {
		p.syntax(p.start, p.pos, fmt.Sprintf("`first of` is the whole right side of a definition and takes no %s", quoted(p.here())))
	}
	return f
}

// where reads `where f_u [MPa], d [mm]`.
func (p *parser) where(def *Definition) {
	start, end := p.start, p.pos
	p.advance()
	for {
		if p.tok != tName {
			if p.tok == tEnd || p.tok >= tIf {
				p.syntax(start, end, "behind `where` stand the names that are taken as plain numbers, each with its unit, as in `where f_u [MPa], d [mm]`")
			} else {
				p.syntax(p.start, p.pos, fmt.Sprintf("behind `where` stand names with their units, as in `where f_u [MPa], d [mm]`, not %s", quoted(p.here())))
			}
			return
		}
		item := WhereItem{Name: p.name()}
		for _, w := range def.Where {
			if w.Name.ID == item.Name.ID {
				p.fail(item.Name.At, diag.Syntax, fmt.Sprintf("%s is named twice behind `where`", quoted(item.Name.Text)))
				return
			}
		}
		if p.tok != tOpenUnit {
			p.fail(item.Name.At, diag.Syntax, fmt.Sprintf("%s needs its unit behind `where`, as in `where d [mm]`", quoted(item.Name.Text)))
			return
		}
		if item.Unit = p.unitRef(unitOnly); item.Unit == nil {
			return
		}
		def.Where = append(def.Where, item)
		if p.tok != tComma {
			return
		}
		p.advance()
	}
}

// skipBranches takes the lines that go on with a definition that could not be
// read, so that they are not reported as strays.
func (p *parser) skipBranches(at diag.Span) diag.Span {
	for p.goesOn(tAssign) {
		at.End = p.bounds().End
	}
	if p.goesOn(tWhere) {
		at.End = p.bounds().End
	}
	p.tok = tFailed
	return at
}
