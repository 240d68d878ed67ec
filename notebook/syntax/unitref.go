package syntax

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/units"
)

// bracketKind says what square brackets may hold where they stand.
type bracketKind int

const (
	unitOnly       bracketKind = iota // behind `where`, in a header, in text
	unitOrQuantity                    // behind a name that is defined
	parameterType                     // `column of …` too
)

// unitRef reads `[MPa]`, or in the place of a unit a quantity's name:
// `[force]`, `[column of length]`. The current token is the bracket. It returns
// nil after a mistake.
func (p *parser) unitRef(kind bracketKind) *UnitRef {
	open := p.start
	n := strings.IndexByte(p.s[open:p.end], ']')
	if n < 0 {
		p.syntax(open, open+1, "the bracket `[` is not closed")
		return nil
	}
	p.pos = open + n + 1
	u := p.unitIn(open, p.pos)
	if u != nil && !p.allowed(u, kind) {
		return nil
	}
	if u != nil {
		p.advance()
	}
	return u
}

// allowed refuses a quantity where a unit is asked, and a column outside the
// parameters of a helper.
func (p *parser) allowed(u *UnitRef, kind bracketKind) bool {
	switch {
	case u.Column && kind != parameterType:
		p.fail(u.At, diag.Syntax, "`column of` types a parameter of a helper only")
	case u.Quantity != "" && kind == unitOnly && u.Quantity != "number":
		p.fail(u.At, diag.Syntax, fmt.Sprintf("a unit is asked here, and %s is a quantity", quoted(u.Text)))
	default:
		return true
	}
	return false
}

// unitIn reads the brackets between two offsets.
func (p *parser) unitIn(open, end int) *UnitRef {
	l := trimmed(p.s, open+1, end-1)
	text := p.s[l.Start:l.End]
	u := p.unitRefs.One(p.size)
	*u = UnitRef{At: p.span(open, end), Text: text}
	switch {
	case text == "":
		p.syntax(open, end, "the brackets hold no unit", "a plain number needs none; to say so write `[number]`")
		return nil
	case text == "-" || text == "1":
		p.syntax(open, end, fmt.Sprintf("%s is no unit; a plain number needs none", quoted(text)), "to say so write `[number]`")
		return nil
	}
	if p.quantity(u, text) {
		return u
	}
	var ok bool
	if u.Unit, ok = p.parseUnit(l.Start, l.End); !ok {
		return nil
	}
	u.Dim, u.Point = u.Unit.Dim(), u.Unit.IsPoint()
	return u
}

// quantity reads a quantity's name. Units come first where a word is both.
func (p *parser) quantity(u *UnitRef, text string) bool {
	if len(text) < 4 || units.IsUnitName(text) {
		return false
	}
	name := strings.Join(strings.Fields(text), " ")
	of, column := strings.CutPrefix(strings.ReplaceAll(name, "-", " "), "column of ")
	if column {
		name = of
	}
	if column && units.IsUnitName(of) {
		u.Unit, _ = units.Lookup(of)
		u.Dim, u.Point, u.Column = u.Unit.Dim(), u.Unit.IsPoint(), true
		return true
	}
	dim, ok := units.QuantityByName(name)
	if !ok {
		return false
	}
	u.Quantity, u.Dim, u.Point, u.Column = name, dim, units.QuantityPoint(name), column
	return true
}

// ValueRef is a value named in prose, `{tau}` or `{tau [ksi]}`.
type ValueRef struct {
	At   diag.Span // with the braces
	Name *Name     // Slot -1
	Unit *UnitRef  // nil where none is given
}

// ParseValueRef reads the braces that at spans. Where ok is false they are
// ordinary text; where d is set they name a value in a unit that cannot be read.
func ParseValueRef(src *diag.Source, at diag.Span) (ref ValueRef, ok bool, d *diag.Diagnostic) {
	ref.At = at
	p := newParser(src, at, newSlabs(at.End-at.Start))
	l := trimmed(p.s, 1, len(p.s)-1)
	if len(p.s) < 3 || l.Start >= l.End {
		return ref, false, nil
	}
	j := dottedEnd(p.s, l.Start, l.End)
	if j == l.Start || IsReserved(p.s[l.Start:j]) {
		return ref, false, nil
	}
	if p.holdName(l.Start, j); p.failed {
		return ref, false, &p.diags[0]
	}
	i := blanksEnd(p.s, j)
	if i < l.End && (p.s[i] != '[' || p.s[l.End-1] != ']' || strings.IndexByte(p.s[i:l.End], ']') != l.End-1-i) {
		return ref, false, nil
	}
	text := p.s[l.Start:j]
	ref.Name = &Name{At: p.span(l.Start, j), ID: Canonical(text), Text: text, Slot: -1}
	if i < l.End {
		p.whole(i, l.End)
		if ref.Unit = p.unitRef(unitOnly); len(p.diags) > 0 {
			return ref, true, &p.diags[0]
		}
	}
	return ref, true, nil
}
