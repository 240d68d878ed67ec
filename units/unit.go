package units

import (
	"errors"
	"math"
	"math/big"
	"strconv"
	"strings"
)

// atom is one unit name, prefix included.
type atom struct {
	name    string // as it is written in a calc file
	printed string // as it is printed on a page
	dim     Dimension
	factor  factor
	zero    *big.Rat // a temperature scale's zero above absolute zero, in K; nil for all other units
	angle   bool
	joule   bool
	unit    Unit // the name alone
}

// term is one atom in a unit expression with its power, or the leading 1 of 1/K (atom nil).
type term struct {
	atom        *atom
	sep         byte // 0 for the first, else '*', '/' or '-'
	open, close bool
	over        bool // divides: it stands behind / or in brackets behind /
	pow         exponent
	start, end  int // the name's place in the spelling
}

// parsed is what a unit expression means. It is never changed once made.
type parsed struct {
	text           string
	terms          []term
	dim            Dimension
	factor         factor
	toSI, fromSI   pair
	zero           *big.Rat // set for a point of temperature
	zeroSI         pair
	angular        bool
	starAfterSlash bool
}

// Unit is a unit expression. It is immutable; the zero value is the unit of plain numbers, written as nothing.
type Unit struct {
	_ [0]func() // not comparable: see Equal
	p *parsed
}

// plain is what the zero Unit stands for.
var plain = &parsed{factor: factorOne, toSI: pair{1, 0}, fromSI: pair{1, 0}}

func (u Unit) get() *parsed {
	if u.p == nil {
		return plain
	}
	return u.p
}

// Equal reports whether two units are spelled alike.
func (u Unit) Equal(o Unit) bool { return u.get().text == o.get().text }

// Dim returns the dimension of the unit.
func (u Unit) Dim() Dimension { return u.get().dim }

// IsPoint reports whether values in the unit are points of temperature: degC or degF alone.
func (u Unit) IsPoint() bool { return u.get().zero != nil }

// IsAngular reports whether the unit is an angle per time, like rad/s. Hz and rpm count turns and are not.
func (u Unit) IsAngular() bool { return u.get().angular }

// CountsTurns reports whether the unit is a frequency by its name, Hz or rpm; 1/s says neither turns nor
// radians.
func (u Unit) CountsTurns() bool {
	if u.Dim() != dimFrequency || u.IsAngular() {
		return false
	}
	for _, at := range u.Names() {
		if at.Name == "rpm" || strings.HasSuffix(at.Name, "Hz") {
			return true
		}
	}
	return false
}

// StarAfterSlash reports whether a * follows a / without brackets, as in J/kg*K, which reads from
// the left and is easily read otherwise.
func (u Unit) StarAfterSlash() bool { return u.get().starAfterSlash }

// ToSI converts a value in the unit to coherent SI, a point of temperature to kelvins above absolute zero.
func (u Unit) ToSI(x float64) float64 {
	p := u.get()
	if p.zero != nil {
		return p.toSI.timesPlus(x, p.zeroSI)
	}
	return p.toSI.times(x)
}

// FromSI converts a value in coherent SI to the unit.
func (u Unit) FromSI(x float64) float64 {
	p := u.get()
	if p.zero == nil {
		return p.fromSI.times(x)
	}
	// A float64 near 300 K is good to 6e-14 K. What the subtraction lays bare below 1e-11 is no
	// temperature but rounding, so it is taken off: 293.25 K is 20.1 degC.
	y := p.fromSI.times(x - p.zeroSI.hi)
	if math.Abs(y) < 1e4 {
		return math.Round(y*1e11) / 1e11
	}
	return y
}

// LiteralToSI converts an exact number in the unit to coherent SI, rounded once.
func (u Unit) LiteralToSI(r *big.Rat) float64 {
	p := u.get()
	if p.zero == nil {
		return p.factor.scale(r)
	}
	sum := new(big.Rat).Mul(r, p.factor.big())
	return ratFloat(sum.Add(sum, p.zero))
}

// Exact returns the factor to SI as r·π^pi. ok is false where a fractional power made the factor
// irrational; r is then a close approximation. The zero of a temperature scale is not part of it.
func (u Unit) Exact() (r *big.Rat, pi int, ok bool) {
	f := u.get().factor
	return new(big.Rat).Set(f.big()), f.pi, !f.irrational
}

// String returns the unit as it was written in the source.
func (u Unit) String() string { return u.get().text }

// Term is one factor of a unit expression, for setting it on a page.
type Term struct {
	Sep         string // before the term: "" for the first, else "·", "/" or "-"
	Open, Close bool   // a bracket before or behind the term
	Name        string // as printed: °C, µm, %; or the 1 of 1/K
	Num, Den    int    // the power; 1 and 1 where there is none
}

// Terms returns the factors of the expression in the order they were written.
func (u Unit) Terms() []Term {
	p := u.get()
	terms := make([]Term, len(p.terms))
	for i, t := range p.terms {
		terms[i] = Term{Open: t.open, Close: t.close, Name: p.printed(t), Num: int(t.pow.num), Den: int(t.pow.den())}
		switch t.sep {
		case '*':
			terms[i].Sep = "·"
		case '/', '-':
			terms[i].Sep = string(t.sep)
		}
	}
	return terms
}

// printed returns a term's name on the page. A difference in degrees Rankine, alone, is what a US
// engineer calls °F.
func (p *parsed) printed(t term) string {
	switch {
	case t.atom == nil:
		return "1"
	case len(p.terms) == 1 && t.atom.printed == "°R":
		return "°F"
	}
	return t.atom.printed
}

// Pretty returns the unit as it is printed, in plain Unicode: kN·m, N/mm², kg/(m·s²), °C, m¹ᐟ².
func (u Unit) Pretty() string {
	var b strings.Builder
	for _, t := range u.Terms() {
		b.WriteString(t.Sep)
		if t.Open {
			b.WriteByte('(')
		}
		b.WriteString(t.Name)
		if t.Num != 1 || t.Den != 1 {
			writeSuperscript(&b, t.Num)
			if t.Den != 1 {
				b.WriteRune(superSlash)
				writeSuperscript(&b, t.Den)
			}
		}
		if t.Close {
			b.WriteByte(')')
		}
	}
	return b.String()
}

const (
	superMinus = '⁻'
	superSlash = 'ᐟ'
)

var superDigits = [10]rune{'⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'}

func writeSuperscript(b *strings.Builder, n int) {
	for _, c := range strconv.Itoa(n) {
		if c == '-' {
			b.WriteRune(superMinus)
		} else {
			b.WriteRune(superDigits[c-'0'])
		}
	}
}

// NameAt is a unit name inside a unit expression.
type NameAt struct {
	Name       string
	Start, End int    // byte offsets into the spelling
	After      string // the sign it stands behind, brackets aside: "" for the first, else "*", "/" or "-"
}

// Names returns the unit names of the expression in the order they were written.
func (u Unit) Names() []NameAt {
	p := u.get()
	names := make([]NameAt, 0, len(p.terms))
	for _, t := range p.terms {
		if t.atom == nil {
			continue
		}
		n := NameAt{Name: t.atom.name, Start: t.start, End: t.end}
		if t.sep != 0 {
			n.After = string(t.sep)
		}
		names = append(names, n)
	}
	return names
}

// newParsed works out what a list of terms means.
func newParsed(text string, terms []term) (*parsed, error) {
	p := &parsed{text: text, terms: terms, factor: factorOne}
	angle, slash := false, false
	for i, t := range terms {
		if t.sep == '*' && slash {
			p.starAfterSlash = true
		}
		if t.open { // brackets say what belongs together
			slash = false
		} else if t.sep == '/' {
			slash = true
		}
		if t.close {
			slash = slashBefore(terms[:i+1])
		}
		if t.atom == nil {
			continue
		}
		num, den := int64(t.pow.num), t.pow.den()
		if t.over {
			num = -num
		}
		if num > 0 && t.atom.angle {
			angle = true
		}
		power, err := t.atom.dim.Pow(num, den)
		if err == nil {
			p.dim, err = p.dim.Mul(power)
		}
		if err != nil {
			return nil, err
		}
		p.factor = p.factor.mul(t.atom.factor.pow(int(num), int(den)))
	}
	p.toSI, p.fromSI = p.factor.pair(), p.factor.inverse().pair()
	if !inRange(p.toSI.hi) || !inRange(p.fromSI.hi) {
		return nil, errors.New("the factor to SI is beyond what double precision holds")
	}
	p.angular = angle && p.dim == dimFrequency
	if len(terms) == 1 && terms[0].atom != nil && terms[0].atom.zero != nil && terms[0].pow == (exponent{num: 1}) {
		p.zero = terms[0].atom.zero
		p.zeroSI = ratPair(p.zero)
	}
	return p, nil
}

func inRange(x float64) bool { return x > 1e-300 && x < 1e300 }

// slashBefore reports whether the bracket that ends with the last term stands behind a slash.
func slashBefore(terms []term) bool {
	for i := len(terms) - 1; i >= 0; i-- {
		if terms[i].open {
			return terms[i].sep == '/'
		}
	}
	return false
}
