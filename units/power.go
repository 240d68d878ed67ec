package units

import (
	"math/big"
	"regexp"
	"strings"
	"unicode/utf8"
)

// powerFollows reports whether a power stands at the parser's place.
func (p *parser) powerFollows() bool {
	if p.pos == len(p.s) {
		return false
	}
	r, _ := utf8.DecodeRuneInString(p.s[p.pos:])
	return r == '^' || r == superMinus || superDigit(r) >= 0
}

// power reads ^2, ^-1, ^(1/2), ^(-3/2), or superscript figures; none is the power 1.
func (p *parser) power() (exponent, *ParseError) {
	if !p.powerFollows() {
		return exponent{num: 1}, nil
	}
	start := p.pos
	var sc powerScanner
	if p.s[p.pos] == '^' {
		sc = powerScanner{s: p.s, pos: p.pos + 1, digit: plainDigit, minus: "-−", slash: '/'}
	} else {
		sc = powerScanner{s: p.s, pos: p.pos, digit: superDigit, minus: string(superMinus), slash: superSlash}
	}
	bracket := sc.digit('0') == 0 && sc.take("(")
	negative := sc.take(sc.minus)
	num, ok := sc.number()
	den := int64(1)
	// without brackets m^1/2 would be m/2; superscripts cannot be misread
	if ok && (bracket || sc.slash == superSlash) && sc.take(string(sc.slash)) {
		den, ok = sc.number()
	}
	if ok && bracket {
		ok = sc.take(")")
	}
	p.pos = sc.pos
	switch {
	case !ok, sc.slash == '/' && strings.HasPrefix(p.s[p.pos:], "."):
		return exponent{}, p.badPower(start)
	case num == 0:
		return exponent{}, fault("syntax", start, p.pos, "a unit to the power 0 is no unit")
	case den == 0:
		return exponent{}, fault("syntax", start, p.pos, "a power has the denominator 0")
	}
	e, ok := newExponent(num, den)
	if negative {
		e.num = -e.num
	}
	if !ok || num == farBeyond || den == farBeyond {
		return exponent{}, fault("bound-exceeded", start, p.pos, "a power in a unit is beyond the bound of %d on its numerator or denominator", maxExponent)
	}
	return e, nil
}

// decimal power, in brackets or not, and what follows it directly
var decimalPower = regexp.MustCompile(`^\^(?:([-−]?[0-9]{0,3}\.[0-9]{1,4})|\(([-−]?[0-9]{0,3}\.[0-9]{1,4})\))([0-9.]?)`)

// badPower answers a power that cannot be read; m^0.5 and m^1.5 get the fraction.
func (p *parser) badPower(start int) *ParseError {
	match := decimalPower.FindStringSubmatch(p.s[start:])
	if match == nil || match[3] != "" {
		return fault("syntax", start, len(p.s), "a power is a whole number, or a fraction in brackets, as in `m^2` and `m^(1/2)`")
	}
	err := fault("wrong-unit-spelling", start, start+len(match[0]), "a fractional power is written as a fraction in brackets, as in `m^(1/2)`")
	r, ok := new(big.Rat).SetString(strings.Replace(match[1]+match[2], "−", "-", 1))
	if ok && r.Sign() != 0 {
		if e, ok := newExponent(r.Num().Int64(), r.Denom().Int64()); ok {
			if err.Fix = powerText(e); err.Fix == "" {
				err.Fix = "^1"
			}
		}
	}
	return err
}

func plainDigit(r rune) int {
	if '0' <= r && r <= '9' {
		return int(r - '0')
	}
	return -1
}

func superDigit(r rune) int {
	for i, d := range superDigits {
		if r == d {
			return i
		}
	}
	return -1
}

// powerScanner reads the figures of a power, plain or superscript.
type powerScanner struct {
	s     string
	pos   int
	digit func(rune) int // the figure's value, or -1
	minus string         // the accepted minus signs
	slash rune
}

// take skips one character that is in set.
func (sc *powerScanner) take(set string) bool {
	r, size := utf8.DecodeRuneInString(sc.s[sc.pos:])
	if size == 0 || !strings.ContainsRune(set, r) {
		return false
	}
	sc.pos += size
	return true
}

// farBeyond stands for every number too large to be worth reading.
const farBeyond = 1e6 + 1

// number reads a whole number, at most farBeyond.
func (sc *powerScanner) number() (int64, bool) {
	n, seen := int64(0), false
	for sc.pos < len(sc.s) {
		r, size := utf8.DecodeRuneInString(sc.s[sc.pos:])
		d := sc.digit(r)
		if d < 0 {
			break
		}
		if n = n*10 + int64(d); n > 1e6 {
			n = farBeyond
		}
		seen = true
		sc.pos += size
	}
	return n, seen
}
