package units

import (
	"errors"
	"fmt"
	"strconv"
	"strings"
)

// maxExponent bounds numerator and denominator of every exponent. No formula of the trade comes
// near it, and it keeps exact arithmetic on exponents and factors small.
const maxExponent = 100

// The base units, in the order of a dimension's exponents.
var baseNames = [7]string{"m", "kg", "s", "A", "K", "mol", "cd"}

const (
	baseLength = iota
	baseMass
	baseTime
	baseCurrent
	baseTemperature
	baseAmount
	baseLuminous
)

// baseOrder is the order in which a product of base units is written: kg*m/s^2, not m*kg/s^2.
var baseOrder = [7]int{baseMass, baseLength, baseTime, baseCurrent, baseTemperature, baseAmount, baseLuminous}

// exponent is a fraction in lowest terms. The denominator is held less one, so that the zero value is 0/1.
type exponent struct{ num, denLess1 int16 }

func (e exponent) den() int64 { return int64(e.denLess1) + 1 }

func (e exponent) String() string {
	if e.denLess1 == 0 {
		return strconv.Itoa(int(e.num))
	}
	return fmt.Sprintf("%d/%d", e.num, e.den())
}

// newExponent reduces num/den; it reports false where the bound is exceeded. den is positive.
func newExponent(num, den int64) (exponent, bool) {
	if den != 1 {
		g := int64(gcd(magnitude(num), uint64(den)))
		num, den = num/g, den/g
	}
	if num < -maxExponent || num > maxExponent || den > maxExponent {
		return exponent{}, false
	}
	return exponent{int16(num), int16(den - 1)}, true
}

func magnitude(n int64) uint64 {
	if n < 0 {
		return -uint64(n)
	}
	return uint64(n)
}

func gcd(a, b uint64) uint64 {
	if a == 1 || b == 1 {
		return 1
	}
	for b != 0 {
		a, b = b, a%b
	}
	return a
}

// Dimension is what a value measures: exact rational exponents over the seven SI base units.
// Dimensions are compared with ==; the zero value is that of a plain number.
type Dimension struct{ exp [7]exponent }

// IsNumber reports whether d is the dimension of a plain number (ratios, angles and strains are such).
func (d Dimension) IsNumber() bool { return d == Dimension{} }

// Mul returns the dimension of a product. The error names the bound on exponents.
func (d Dimension) Mul(o Dimension) (Dimension, error) { return d.add(o, 1) }

// Div returns the dimension of a quotient. The error names the bound on exponents.
func (d Dimension) Div(o Dimension) (Dimension, error) { return d.add(o, -1) }

func (d Dimension) add(o Dimension, sign int64) (Dimension, error) {
	for i, b := range o.exp {
		if b.num == 0 {
			continue
		}
		a := d.exp[i]
		sum, ok := newExponent(int64(a.num)*b.den()+sign*int64(b.num)*a.den(), a.den()*b.den())
		if !ok {
			return Dimension{}, boundError(i)
		}
		d.exp[i] = sum
	}
	return d, nil
}

// Pow returns the dimension of a power with the exponent num/den.
func (d Dimension) Pow(num, den int64) (Dimension, error) {
	if den == 0 {
		return Dimension{}, errors.New("an exponent has the denominator 0")
	}
	if d.IsNumber() {
		return d, nil
	}
	if den < 0 {
		num, den = -num, -den
	}
	if g := int64(gcd(magnitude(num), uint64(den))); g > 1 {
		num, den = num/g, den/g
	}
	// Beyond this no product with an exponent within bounds can come back within them.
	const limit = maxExponent * maxExponent
	for i, a := range d.exp {
		if a.num == 0 {
			continue
		}
		if num < -limit || num > limit || den < 0 || den > limit {
			return Dimension{}, boundError(i)
		}
		e, ok := newExponent(int64(a.num)*num, a.den()*den)
		if !ok {
			return Dimension{}, boundError(i)
		}
		d.exp[i] = e
	}
	return d, nil
}

func boundError(base int) error {
	return fmt.Errorf("the exponent of %s outgrows the bound of %d on its numerator or denominator", baseNames[base], maxExponent)
}

// Base returns the dimension as a product of SI base units in the notation's spelling,
// such as kg/(m*s^2). It is empty for a plain number.
func (d Dimension) Base() string { return product(d, baseNames) }

// product writes d as a product of the given names, one for each base.
func product(d Dimension, names [7]string) string {
	var over, under []string
	for _, i := range baseOrder {
		e := d.exp[i]
		switch {
		case e.num > 0:
			over = append(over, names[i]+powerText(e))
		case e.num < 0:
			e.num = -e.num
			under = append(under, names[i]+powerText(e))
		}
	}
	text := strings.Join(over, "*")
	if len(under) == 0 {
		return text
	}
	if text == "" {
		text = "1"
	}
	if len(under) == 1 {
		return text + "/" + under[0]
	}
	return text + "/(" + strings.Join(under, "*") + ")"
}

// powerText writes an exponent as it stands behind a unit: nothing, ^2, ^-1 or ^(1/2).
func powerText(e exponent) string {
	switch {
	case e.denLess1 != 0:
		return "^(" + e.String() + ")"
	case e.num == 1:
		return ""
	}
	return "^" + e.String()
}
