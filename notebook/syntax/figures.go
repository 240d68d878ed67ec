package syntax

import (
	"errors"
	"math"
	"math/big"
	"strconv"
	"strings"
)

// The bounds on a number's figures and on its exponent of ten, so that its
// exact value stays small.
const (
	maxFigures  = 1000
	maxExponent = 400
)

// figuresEnd returns the end of the plain figures that start at i:
// `12`, `12.5`, `.5`, `12_500`, `1.2e-3`. whole tells that they are digits only.
func figuresEnd(s string, i, end int) (j int, whole bool) {
	j = digitsEnd(s, i, end)
	whole = j > i
	if j < end && s[j] == '.' && j+1 < end && isDigit(s[j+1]) {
		j, whole = digitsEnd(s, j+1, end), false
	}
	if j < end && (s[j] == 'e' || s[j] == 'E') {
		k := j + 1
		if k < end && (s[k] == '+' || s[k] == '-') {
			k++
		}
		if k < end && isDigit(s[k]) {
			for k < end && isDigit(s[k]) {
				k++
			}
			j, whole = k, false
		}
	}
	return j, whole
}

// digitsEnd returns the end of a run of digits, with underscores between them.
func digitsEnd(s string, i, end int) int {
	for i < end && (isDigit(s[i]) || s[i] == '_' && i+1 < end && isDigit(s[i+1]) && i > 0 && isDigit(s[i-1])) {
		i++
	}
	return i
}

// checkFigures tells what is wrong with plain figures as a number, or "":
// notANumber where a double cannot hold them, tooLong over the bounds.
func checkFigures(s string) figuresFault {
	if len(s) <= 15 && !strings.ContainsAny(s, "eE") {
		return figuresGood
	}
	if len(s) > maxFigures {
		return figuresLong
	}
	bare := strings.ReplaceAll(s, "_", "")
	f, _ := strconv.ParseFloat(bare, 64)
	mantissa, exponent, _ := strings.Cut(strings.ToLower(bare), "e")
	switch {
	case math.IsInf(f, 0):
		return figuresInfinite
	case f == 0 && strings.ContainsAny(mantissa, "123456789"):
		return figuresVanish
	}
	if n, err := strconv.Atoi(strings.TrimPrefix(exponent, "+")); exponent != "" && (err != nil || n > maxExponent || n < -maxExponent) {
		return figuresLong
	}
	return figuresGood
}

type figuresFault int

const (
	figuresGood figuresFault = iota
	figuresInfinite
	figuresVanish
	figuresLong
)

// Rat returns the exact value of the figures, mixed numbers and fractions
// included.
func (p Piece) Rat() (*big.Rat, error) {
	if p.Figures == "" {
		return nil, errors.New("no figures")
	}
	sum := new(big.Rat)
	for field := range strings.FieldsSeq(p.Figures) {
		num, den, fraction := strings.Cut(field, "/")
		part, err := plainRat(num)
		if err != nil {
			return nil, err
		}
		if fraction {
			below, err := plainRat(den)
			if err != nil || below.Sign() == 0 {
				return nil, errors.New("the fraction has no value")
			}
			part.Quo(part, below)
		}
		sum.Add(sum, part)
	}
	return sum, nil
}

func plainRat(s string) (*big.Rat, error) {
	if len(s) > maxFigures {
		return nil, errors.New("too many figures")
	}
	bare := strings.ReplaceAll(s, "_", "")
	if i := strings.IndexAny(bare, "eE"); i >= 0 {
		if n, err := strconv.Atoi(bare[i+1:]); err != nil || n > maxExponent || n < -maxExponent {
			return nil, errors.New("the exponent is out of bounds")
		}
	}
	r, ok := new(big.Rat).SetString(bare)
	if !ok {
		return nil, errors.New("no figures")
	}
	return r, nil
}

// SI is the value of a piece in coherent SI, rounded once. A sign belongs to the
// figures: -40 °C is 233.15 K.
func (p Piece) SI(negative bool) float64 {
	if mant, exp, ok := p.Decimal(); ok {
		if si, ok := p.Unit.DecimalToSI(mant, exp); ok {
			if negative {
				return -si
			}
			return si
		}
	}
	r, err := p.Rat()
	if err != nil {
		return 0
	}
	if negative {
		r.Neg(r)
	}
	return p.Unit.LiteralToSI(r)
}

// Decimal returns figures of at most 15 digits as mant·10^exp10. ok is false
// for all others, which Rat reads.
func (p Piece) Decimal() (mant int64, exp10 int, ok bool) {
	s := p.Figures
	i, digits, point := 0, 0, false
	for ; i < len(s); i++ {
		c := s[i]
		switch {
		case isDigit(c):
			mant = mant*10 + int64(c-'0')
			if digits++; digits > 15 {
				return 0, 0, false
			}
			if point {
				exp10--
			}
		case c == '.' && !point:
			point = true
		case c == '_':
		case c == 'e' || c == 'E':
			n, err := strconv.Atoi(s[i+1:])
			if err != nil || digits == 0 || n > maxExponent || n < -maxExponent {
				return 0, 0, false
			}
			return mant, exp10 + n, true
		default:
			return 0, 0, false
		}
	}
	return mant, exp10, digits > 0
}
