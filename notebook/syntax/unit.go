package syntax

import (
	"fmt"
	"strings"
	"unicode/utf8"

	"gusset/notebook/diag"
	"gusset/units"
)

// unit reads the unit that starts at u, behind the figures of the literal that
// starts at lit. A unit is written tight and ends before a blank, and before a
// sign that is followed by a figure, a call or a bracket that is no unit.
func (p *parser) unit(lit, u int) (unit units.Unit, end int, ok bool) {
	i, first := u, true
	if p.s[i] == '1' { // of 1/K
		if i += 2; p.s[i] == '(' {
			first = false
			if i, end = p.unitSign(i, p.unitBracket(i)); i == 0 {
				unit, ok = p.parseUnit(u, end)
				return unit, end, ok
			}
		}
	}
	for ; ; first = false {
		j := unitNameEnd(p.s, i, p.end)
		name := p.s[i:j]
		switch {
		case first && !units.IsUnitName(name):
			p.noUnit(lit, u, i, j)
			return unit, 0, false
		case !first && j < p.end && p.s[j] == '.' && j+1 < p.end && byteClass[p.s[j+1]]&letterByte != 0,
			!first && !units.IsUnitName(name):
			p.noFactor(lit, u, i, j)
			return unit, 0, false
		}
		if j, ok = p.unitPower(lit, j); !ok {
			return unit, 0, false
		}
		if j < p.end && p.s[j] == '.' {
			if e := nameEnd(p.s, j+1, p.end); units.IsUnitName(p.s[j+1 : e]) {
				p.parseUnit(u, e) // which refuses the point
				return unit, 0, false
			}
		}
		next, closed := p.unitSign(i, j)
		if next == 0 {
			end = closed
			break
		}
		i = next
	}
	unit, ok = p.parseUnit(u, end)
	return unit, end, ok
}

// unitNameEnd returns the end of a unit's name at i, or of the name of a value
// that stands in its place.
func unitNameEnd(s string, i, end int) int {
	if j := nameEnd(s, i, end); j > i {
		return j
	}
	return i + units.ScanName(s[i:end])
}

// unitPower returns the end of a power behind a unit's name that ends at i.
func (p *parser) unitPower(lit, i int) (int, bool) {
	if i >= p.end {
		return i, true
	}
	if p.s[i] != '^' {
		if p.s[i] < utf8.RuneSelf {
			return i, true
		}
		return superEnd(p.s, i, p.end), true
	}
	if j := powerEnd(p.s, i+1, p.end); j > 0 {
		return j, true
	}
	e := p.operandEnd(p.skipBlanks(i + 1))
	p.syntax(lit, e, fmt.Sprintf("the power behind %s belongs to the unit and has to be a whole number, or a fraction as in `m^(1/2)`", quoted(p.s[lit:i])),
		"for a power of the value write "+quoted("("+p.s[lit:i]+")"+p.s[i:e]))
	return 0, false
}

// powerEnd returns the end of a unit's power: `2`, `-1`, `(1/2)`, or 0.
func powerEnd(s string, i, end int) int {
	open := i < end && s[i] == '('
	if open {
		i++
	}
	if i < end && s[i] == '-' {
		i++
	} else if strings.HasPrefix(s[i:end], "−") {
		i += len("−")
	}
	j := digitsEnd(s, i, end)
	if j == i || !open && j < end && s[j] == '.' {
		return 0
	}
	if open && j < end && s[j] == '/' {
		k := digitsEnd(s, j+1, end)
		if k == j+1 {
			return 0
		}
		j = k
	}
	if !open {
		return j
	}
	if j < end && s[j] == ')' {
		return j + 1
	}
	return 0
}

// unitSign looks at what stands behind a factor that spans from i to j. It returns the start of the next factor; where the
// unit ends it returns 0 and the unit's end, a bracket of units included.
func (p *parser) unitSign(i, j int) (next, end int) {
	if j >= p.end {
		return 0, j
	}
	r, size := rune(p.s[j]), 1
	if r >= utf8.RuneSelf {
		r, size = utf8.DecodeRuneInString(p.s[j:p.end])
	}
	k := j + size
	switch r {
	case '*', '/', '·', '⋅', '×', '÷':
		if k < p.end && p.s[k] == '(' {
			e := p.unitBracket(k)
			if e == 0 {
				return 0, j
			}
			if next, end = p.unitSign(i, e); next == 0 && end < e {
				return 0, e
			}
			return next, end
		}
		e := unitNameEnd(p.s, k, p.end)
		if e == k || p.callAt(e) {
			return 0, j
		}
		return k, 0
	case '-':
		if e := unitNameEnd(p.s, k, p.end); e > k && hyphenJoins(p.s[i:j], p.s[k:e]) && !p.callAt(e) {
			return k, 0
		}
	}
	return 0, j
}

// callAt tells whether the name that ends at i is called.
func (p *parser) callAt(i int) bool { return i < p.end && p.s[i] == '(' }

// hyphenJoins tells whether two names behind figures are one force unit and
// one length unit, as in `kip-ft`, slips like `ft-lb` included.
func hyphenJoins(left, right string) bool {
	a, b := hyphenKind(left), hyphenKind(right)
	return a != b && a != "" && b != ""
}

// hyphenKind is "length" or "force" for a unit of these, and for a slip for one.
func hyphenKind(name string) string {
	unit, ok := units.Lookup(name)
	if !ok {
		fix, slip := units.Misspelled(name)
		switch {
		case slip && fix == "": // lb, ton
			return "force"
		case !slip:
			return ""
		}
		unit, _ = units.Lookup(fix)
	}
	if n := unit.Dim().Name(); n == "force" || n == "length" {
		return n
	}
	return ""
}

// unitBracket returns the end of a bracket at i that holds units only, or 0.
func (p *parser) unitBracket(i int) int {
	i++
	for {
		j := unitNameEnd(p.s, i, p.end)
		if j == i || !units.IsUnitName(p.s[i:j]) {
			return 0
		}
		if j < p.end && p.s[j] == '^' {
			if j = powerEnd(p.s, j+1, p.end); j == 0 {
				return 0
			}
		} else {
			j = superEnd(p.s, j, p.end)
		}
		if j >= p.end {
			return 0
		}
		r, size := utf8.DecodeRuneInString(p.s[j:p.end])
		switch r {
		case ')':
			return j + 1
		case '*', '/', '·', '⋅', '×', '÷', '-':
			i = j + size
		default:
			return 0
		}
	}
}

// maxCached bounds the search through the units met in a block.
const maxCached = 16

// parseUnit returns the unit written between two offsets. What is wrong with
// it is reported and ends the statement.
func (p *parser) parseUnit(start, end int) (units.Unit, bool) {
	text := p.s[start:end]
	for _, c := range p.unitTexts {
		if c.text == text {
			return c.unit, true
		}
	}
	unit, err := units.Parse(text)
	if err != nil {
		p.unitFault(start, text, err)
		return unit, false
	}
	if unit.StarAfterSlash() {
		p.starAfterSlash(start, end, text)
		return unit, true // not kept: each place draws its warning
	}
	if len(p.unitTexts) < maxCached {
		p.unitTexts = append(p.unitTexts, cachedUnit{text, unit})
	}
	return unit, true
}

// unitFault reports why a unit cannot be read.
func (p *parser) unitFault(start int, text string, err error) {
	fault, ok := err.(*units.ParseError)
	if !ok {
		p.syntax(start, start+len(text), err.Error())
		return
	}
	var hints []string
	if fault.Fix != "" && fault.End-fault.Start < len(text) {
		hints = []string{"write " + quoted(text[:fault.Start]+fault.Fix+text[fault.End:])}
	}
	at := p.span(start+fault.Start, start+fault.End)
	if fault.Fix != "" || fault.Start == fault.End {
		at = p.span(start, start+len(text))
	}
	p.fail(at, fault.ID, fault.Message, hints...)
}

// starAfterSlash warns of `J/kg*K` and shows both readings with brackets.
func (p *parser) starAfterSlash(start, end int, text string) {
	hint := "write the unit with brackets, as in `J/(kg*K)`"
	if i := strings.IndexByte(text, '/'); i > 0 && strings.Count(text, "/") == 1 && !strings.ContainsAny(text, "()·⋅×÷") {
		left, right := text[:i], text[i+1:]
		divisor, factors, _ := strings.Cut(right, "*")
		hint = fmt.Sprintf("write %s if that is meant, or %s", quoted(left+"/("+right+")"), quoted(left+"*"+factors+"/"+divisor))
	}
	p.report(diag.Warning, p.span(start, end), diag.AmbiguousUnit,
		fmt.Sprintf("%s is read from the left: what stands behind `*` is not divided by", quoted(text)), hint)
}
