package units

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"
)

// maxText bounds the length of a unit expression in bytes.
const maxText = 200

// ParseError says what is wrong with a unit expression and where.
type ParseError struct {
	ID         string // unknown-unit, wrong-unit-spelling, missing-unit, syntax or bound-exceeded
	Message    string
	Start, End int    // byte offsets of the faulty part
	Fix        string // the spelling to put in place of that part; "" if there is not just one
}

func (e *ParseError) Error() string { return e.Message }

// Parse reads a unit expression, the whole of s, written tight: kN/m^2, N·mm, kg/(m*s^2), mm²,
// m^(1/2), 1/K, kip-ft. The error is a *ParseError.
//
// A power belongs to the name before it. Factors are read from the left, so kg/m/s^2 is
// kg/(m*s^2) and J/kg*K is J*K/kg. Brackets hold a product and do not nest. A hyphen joins one
// force unit and one length unit and binds them more tightly than a slash before them.
func Parse(s string) (Unit, error) {
	if a := catalogue.atoms[s]; a != nil {
		return a.unit, nil
	}
	if u, ok := frequent[s]; ok {
		return u, nil
	}
	u, err := catalogue.parse(s)
	if err != nil {
		return Unit{}, err
	}
	return u, nil
}

// frequent holds the compounds that calc files are full of, read once, since reading one takes
// some forty times as long as finding it here.
var frequent = readFrequent(`
	mm^2 mm^3 mm^4 cm^2 cm^3 cm^4 m^2 m^3 m^4 in^2 in^3 in^4 ft^2 ft^3
	N*mm N*m kN*mm kN*m kN*cm MN*m kip*ft kip-ft kip*in kip-in lbf*ft lbf*in
	N/mm kN/mm kN/m N/m kip/ft kip/in lbf/ft lbf/in
	N/mm^2 kN/mm^2 kN/cm^2 kN/m^2 N/m^2 MN/m^2 lbf/in^2 lbf/ft^2 kip/in^2 kip/ft^2
	kN/m^3 kg/m^3 kg/m lbm/ft^3 lbf/ft^3 m/s m/s^2 ft/s ft/s^2 rad/s 1/K 1/degF 1/m 1/s`)

func readFrequent(list string) map[string]Unit {
	read := map[string]Unit{}
	for _, text := range strings.Fields(list) {
		u, err := catalogue.parse(text)
		if err != nil {
			panic(err)
		}
		read[text] = u
	}
	return read
}

// Lookup returns the unit that a single name stands for, prefix included.
func Lookup(name string) (Unit, bool) {
	if a := catalogue.atoms[name]; a != nil {
		return a.unit, true
	}
	return Unit{}, false
}

// IsUnitName reports whether name is a unit's name, prefix included.
func IsUnitName(name string) bool { return catalogue.atoms[name] != nil }

// ScanName returns the length in bytes of the run at the start of s that a unit's name may be:
// a letter or degree sign, then letters, figures and underscores; or a percent or per mille sign.
func ScanName(s string) int {
	for i := 0; i < len(s); {
		c := s[i]
		switch {
		case 'a' <= c && c <= 'z', 'A' <= c && c <= 'Z', i > 0 && ('0' <= c && c <= '9' || c == '_'):
			i++
		case c < utf8.RuneSelf:
			if c == '%' && i == 0 {
				return 1
			}
			return i
		default:
			r, size := utf8.DecodeRuneInString(s[i:])
			if r == '‰' && i == 0 {
				return size
			}
			if r != '°' && !unicode.IsLetter(r) {
				return i
			}
			i += size
		}
	}
	return len(s)
}

type parser struct {
	table *table
	s     string
	pos   int
	terms []term

	sep      byte // the sign before the next term
	over     bool // the sign before it, or before its bracket, is a slash
	inside   bool // in brackets
	openNext bool // the next term is the first in brackets
	bracket  bool // the bracket stands behind a slash
}

func (t *table) parse(s string) (Unit, *ParseError) {
	if len(s) > maxText {
		return Unit{}, fault("bound-exceeded", 0, len(s), "a unit is longer than the bound of %d bytes", maxText)
	}
	p := parser{table: t, s: s, terms: make([]term, 0, 4)}
	if err := p.run(); err != nil {
		return Unit{}, err
	}
	parsed, err := newParsed(s, p.terms)
	if err != nil {
		return Unit{}, fault("bound-exceeded", 0, len(s), "in `%s` %s", s, err.Error())
	}
	return Unit{p: parsed}, nil
}

func fault(id string, start, end int, format string, args ...any) *ParseError {
	return &ParseError{ID: id, Message: fmt.Sprintf(format, args...), Start: start, End: end}
}

func (p *parser) run() *ParseError {
	for {
		if err := p.term(); err != nil {
			return err
		}
		if p.pos < len(p.s) && p.s[p.pos] == ')' && p.inside {
			p.terms[len(p.terms)-1].close = true
			p.inside = false
			p.pos++
			if p.powerFollows() {
				return fault("syntax", p.pos, len(p.s), "a power belongs to one unit name; give each name in the brackets its own")
			}
		}
		if p.pos == len(p.s) {
			if p.inside {
				return fault("syntax", 0, len(p.s), "`%s` lacks a closing bracket", p.s)
			}
			return nil
		}
		if err := p.sign(); err != nil {
			return err
		}
	}
}

// sign reads the sign between two terms.
func (p *parser) sign() *ParseError {
	rest := p.s[p.pos:]
	r, size := utf8.DecodeRuneInString(rest)
	switch r {
	case '*', '·', '⋅', '×':
		if strings.HasPrefix(rest, "**") {
			return p.doubleStar()
		}
		p.sep = '*'
	case '/', '÷':
		p.sep = '/'
	case '-', '‐', '−':
		p.sep = '-'
	default:
		return p.strange(r, size)
	}
	p.pos += size
	return nil
}

func (p *parser) term() *ParseError {
	if p.sep != '-' {
		p.over = p.sep == '/' != (p.inside && p.bracket)
	}
	for p.pos < len(p.s) && p.s[p.pos] == '(' && p.sep != '-' {
		if p.inside {
			return fault("bound-exceeded", p.pos, p.pos+1, "brackets in a unit nest at most 1 deep")
		}
		p.inside, p.openNext, p.bracket = true, true, p.sep == '/'
		p.pos++
	}
	start := p.pos
	if p.leadingOne() {
		p.terms = append(p.terms, term{open: p.openNext, pow: exponent{num: 1}, start: start, end: start + 1})
		p.openNext = false
		p.pos++
		return nil
	}
	n := ScanName(p.s[start:])
	if n == 0 {
		return p.noName()
	}
	name := p.s[start : start+n]
	a := p.table.atoms[name]
	if a == nil {
		return p.table.unknown(name, start, p.s)
	}
	p.pos += n
	pow, err := p.power()
	if err != nil {
		return err
	}
	t := term{atom: a, sep: p.sep, open: p.openNext, over: p.over, pow: pow, start: start, end: start + n}
	if t.sep == '-' {
		if err := p.checkHyphen(t); err != nil {
			return err
		}
	}
	p.openNext = false
	p.terms = append(p.terms, t)
	return nil
}

// leadingOne reports whether a 1 that something is divided into stands here, as in 1/K.
func (p *parser) leadingOne() bool {
	return len(p.terms) == 0 && strings.HasPrefix(p.s[p.pos:], "1") &&
		(strings.HasPrefix(p.s[p.pos+1:], "/") || strings.HasPrefix(p.s[p.pos+1:], "÷"))
}

// checkHyphen holds a hyphen to one force unit and one length unit without powers.
func (p *parser) checkHyphen(t term) *ParseError {
	last := p.terms[len(p.terms)-1]
	one := exponent{num: 1}
	kinds := last.atom != nil && (last.atom.dim == dimForce && t.atom.dim == dimLength ||
		last.atom.dim == dimLength && t.atom.dim == dimForce)
	if kinds && last.sep != '-' && last.pow == one && t.pow == one && !last.close {
		return nil
	}
	err := fault("wrong-unit-spelling", last.start, p.pos, "a hyphen joins one force unit and one length unit only, as in `kip-ft`; write `*`")
	err.Fix = strings.Replace(p.s[last.start:p.pos], "-", "*", 1)
	return err
}

// noName says what stands where a name was expected.
func (p *parser) noName() *ParseError {
	if p.pos == len(p.s) {
		if p.pos == 0 {
			return fault("missing-unit", 0, 0, "a unit is missing")
		}
		return fault("missing-unit", p.pos, p.pos, "a unit is missing behind `%s`", p.s)
	}
	r, size := utf8.DecodeRuneInString(p.s[p.pos:])
	if '0' <= r && r <= '9' {
		return p.figures()
	}
	switch r {
	case '*', '/', '·', '^', '-', ')':
		return fault("missing-unit", p.pos, p.pos+size, "a unit is missing before `%c`", r)
	}
	return p.strange(r, size)
}

// figures answers a number in a unit: m-2 and m^1/2 mean a power, all else is no unit.
func (p *parser) figures() *ParseError {
	end := p.pos
	for end < len(p.s) && '0' <= p.s[end] && p.s[end] <= '9' {
		end++
	}
	number := p.s[p.pos:end]
	if len(p.terms) > 0 && !p.openNext {
		last := p.terms[len(p.terms)-1]
		switch {
		case p.sep == '-' && last.pow == exponent{num: 1} && !last.close:
			err := fault("wrong-unit-spelling", last.end, end, "a power is written with `^`, as in `m^-1`")
			err.Fix = "^-" + number
			return err
		case p.sep == '/' && last.pow.denLess1 == 0 && p.s[last.end:p.pos] == fmt.Sprintf("^%d/", last.pow.num):
			err := fault("wrong-unit-spelling", last.end, end, "a fractional power stands in brackets, as in `m^(1/2)`")
			err.Fix = fmt.Sprintf("^(%d/%s)", last.pow.num, number)
			return err
		}
	}
	if p.s == "1" {
		return fault("missing-unit", 0, 1, "a unit is missing; a plain number has none")
	}
	return fault("syntax", p.pos, end, "a unit holds no figures but powers and the 1 of `1/K`")
}

func (p *parser) doubleStar() *ParseError {
	err := fault("wrong-unit-spelling", p.pos, p.pos+2, "a power is written with `^`, as in `mm^2`")
	err.Fix = "^"
	return err
}

// strange answers a character that has no place in a unit.
func (p *parser) strange(r rune, size int) *ParseError {
	end := p.pos + size
	switch {
	case unicode.IsSpace(r):
		end = len(p.s) - len(strings.TrimLeftFunc(p.s[p.pos:], unicode.IsSpace))
		return fault("syntax", p.pos, end, "a unit is written without spaces, as in `kN*m`")
	case r == '.' && len(p.terms) > 0:
		err := fault("wrong-unit-spelling", p.pos, end, "units are multiplied with `*`, as in `kN*m`")
		err.Fix = "*"
		return err
	case r == '(' || r == ')':
		return fault("syntax", p.pos, end, "`%c` is out of place in a unit", r)
	case r == utf8.RuneError && size <= 1:
		return fault("syntax", p.pos, end, "a unit holds a byte that is no UTF-8")
	}
	if !unicode.IsPrint(r) {
		return fault("syntax", p.pos, end, "the character %U has no place in a unit", r)
	}
	return fault("syntax", p.pos, end, "`%c` has no place in a unit", r)
}
