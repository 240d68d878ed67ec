package eval

import (
	"math"
	"strconv"
	"strings"

	"gusset/units"
)

// UtilisationText is a check's utilisation as it is printed, which never
// contradicts the verdict: two decimals rounded up, which shows a figure above 1
// for any NG; an OK prints at most 1.00, and sides that are equal where < or >
// is asked print `1.00, equal`. It is empty where there is no utilisation (NaN)
// or where that is not what decided.
func UtilisationText(ratio float64, ok, equal bool) string {
	switch {
	case math.IsNaN(ratio):
		return ""
	case equal:
		return "1.00, equal"
	case ok && ratio > 1:
		return "1.00"
	case !ok && ratio <= 1:
		return ""
	}
	if ratio >= million {
		return roundedUpPower(ratio)
	}
	return roundedUp(ratio)
}

// million is from where on a ratio is printed with a power of ten, as any value is.
const million = 1e6

// roundedUpPower rounds a ratio up to two decimals before its power of ten.
func roundedUpPower(ratio float64) string {
	mantissa, exponent := units.SplitExponent(strconv.FormatFloat(ratio*(1-dust), 'e', -1, 64))
	figures, _ := strconv.ParseFloat(mantissa, 64)
	power, _ := strconv.Atoi(exponent)
	text := roundedUp(figures)
	if text == "10.00" {
		text, power = "1.00", power+1
	}
	return text + "e" + strconv.Itoa(power)
}

const decimals = 2

// roundedUp rounds a ratio up to two decimals. What lies above a figure only
// by the dust of rounding is that figure, so that 0.07 stays 0.07.
func roundedUp(ratio float64) string {
	exact := strconv.FormatFloat(ratio*(1-dust), 'f', -1, 64)
	whole, fraction, _ := strings.Cut(exact, ".")
	if len(fraction) <= decimals {
		return whole + "." + fraction + strings.Repeat("0", decimals-len(fraction))
	}
	rest := fraction[decimals:]
	digits := []byte(whole + fraction[:decimals])
	if strings.Trim(rest, "0") != "" && ratio > 0 {
		digits = increment(digits)
	}
	point := len(digits) - decimals
	return string(digits[:point]) + "." + string(digits[point:])
}

// increment adds one to a number given by its digits.
func increment(digits []byte) []byte {
	for i := len(digits) - 1; i >= 0; i-- {
		if digits[i] != '9' {
			digits[i]++
			return digits
		}
		digits[i] = '0'
	}
	return append([]byte{'1'}, digits...)
}
