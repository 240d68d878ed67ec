package units

import (
	"math"
	"strconv"
	"strings"
)

// defaultFigures are the significant figures printed where the author sets none.
const defaultFigures = 4

// Values from 10^fixedFrom to below 10^fixedBelow, after rounding, are printed without a power of ten.
const (
	fixedFrom  = -3
	fixedBelow = 6
)

// Format prints a number with the given significant figures (0 stands for 4). Whole digits are
// never rounded away, trailing zeros are kept, halves go away from zero by the decimal digits of
// the number, and zero is 0: 48.89, 12346, 384.0, 6.036e-4.
func Format(x float64, figures int) string {
	if x == 0 {
		return "0"
	}
	if math.IsInf(x, 0) || math.IsNaN(x) {
		return strconv.FormatFloat(x, 'g', -1, 64)
	}
	if figures <= 0 {
		figures = defaultFigures
	}
	var buf [32]byte
	digits, power := decimal(buf[:0], math.Abs(x))
	out := make([]byte, 0, 32)
	if x < 0 {
		out = append(out, '-')
	}
	// Rounding to whole digits can be finer than rounding to figures, so it is tried first.
	if whole, p := roundDigits(digits, power, max(figures, power+1)); p >= fixedFrom && p < fixedBelow {
		return string(appendFixed(out, whole, p, figures))
	}
	short, p := roundDigits(digits, power, figures)
	out = append(out, short[0])
	if figures > 1 {
		out = append(out, '.')
		out = appendPadded(out, short[1:], figures-1)
	}
	out = append(out, 'e')
	return string(strconv.AppendInt(out, int64(p), 10))
}

// decimal returns the shortest digits that stand for x and the power of ten of the first.
func decimal(buf []byte, x float64) ([]byte, int) {
	text := strconv.AppendFloat(buf, x, 'e', -1, 64)
	digits := text[:0]
	for i, c := range text {
		if c == 'e' {
			power, _ := strconv.Atoi(string(text[i+1:]))
			return digits, power
		}
		if c != '.' {
			digits = append(digits, c)
		}
	}
	return digits, 0
}

// roundDigits rounds to n digits, halves up, without changing its argument.
func roundDigits(digits []byte, power, n int) ([]byte, int) {
	if n >= len(digits) {
		return digits, power
	}
	rounded := append(make([]byte, 0, 24), digits[:n]...)
	if digits[n] < '5' {
		return rounded, power
	}
	for i := n - 1; i >= 0; i-- {
		if rounded[i] < '9' {
			rounded[i]++
			return rounded, power
		}
		rounded[i] = '0'
	}
	return append([]byte{'1'}, rounded[:n-1]...), power + 1
}

// appendFixed writes digits, the first of which stands for 10^power, with the given figures.
func appendFixed(out, digits []byte, power, figures int) []byte {
	if power < 0 {
		out = append(out, '0', '.')
		for range -power - 1 {
			out = append(out, '0')
		}
		return appendPadded(out, digits, figures)
	}
	whole := power + 1
	out = appendPadded(out, digits[:min(whole, len(digits))], whole)
	if figures > whole {
		out = append(out, '.')
		out = appendPadded(out, digits[min(whole, len(digits)):], figures-whole)
	}
	return out
}

// appendPadded writes digits and zeros up to a width.
func appendPadded(out, digits []byte, width int) []byte {
	out = append(out, digits...)
	for range width - len(digits) {
		out = append(out, '0')
	}
	return out
}

// SplitExponent parts a number at its power of ten: "6.036e-4" is "6.036" and "-4",
// "2.1E+5" is "2.1" and "5".
func SplitExponent(s string) (mantissa, exponent string) {
	i := strings.IndexAny(s, "eE")
	if i < 1 || (s[i-1] < '0' || s[i-1] > '9') && s[i-1] != '.' {
		return s, ""
	}
	return s[:i], strings.TrimPrefix(s[i+1:], "+")
}

// Typeset is a number as a page sets it within a text: "-6.036e-4" is −6.036×10⁻⁴.
func Typeset(s string) string {
	mantissa, exponent := SplitExponent(s)
	if rest, negative := strings.CutPrefix(mantissa, "-"); negative {
		mantissa = "−" + rest
	}
	if exponent == "" {
		return mantissa
	}
	b := []rune(mantissa + "×10")
	for _, c := range exponent {
		switch {
		case c == '-':
			b = append(b, superMinus)
		case c >= '0' && c <= '9':
			b = append(b, superDigits[c-'0'])
		}
	}
	return string(b)
}
