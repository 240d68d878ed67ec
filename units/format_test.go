package units

import (
	"math"
	"math/big"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestFormat(t *testing.T) {
	for _, row := range []struct {
		x       float64
		figures int
		want    string
	}{
		{48.888, 4, "48.89"},
		{12345.6, 4, "12346"},
		{12344.5, 4, "12345"}, // halves away from zero, not to even
		{-12344.5, 4, "-12345"},
		{384, 4, "384.0"},
		{6.0357e-4, 4, "6.036e-4"},
		{0, 4, "0"},
		{math.Copysign(0, -1), 4, "0"},
		{-0.5, 4, "-0.5000"},
		{-0.5, 1, "-0.5"},
		{1, 0, "1.000"},
		{1, 4, "1.000"},
		{1, 1, "1"},
		{10, 1, "10"},
		{15, 1, "15"},
		{0.00099996, 4, "0.001000"},
		{0.00099994, 4, "9.999e-4"},
		{0.0009999999, 4, "0.001000"},
		{0.001, 4, "0.001000"},
		{999999.4, 4, "999999"},
		{999999.5, 4, "1.000e6"},
		{999999.5, 7, "999999.5"},
		{999999.95, 7, "1.000000e6"},
		{1e6, 4, "1.000e6"},
		{1234567, 4, "1.235e6"},
		{1234567, 10, "1.234567000e6"},
		{99.995, 4, "100.0"}, // the decimal value decides, not its binary neighbour below
		{1.0005, 4, "1.001"},
		{2.675, 3, "2.68"},
		{0.1, 4, "0.1000"},
		{0.012345, 4, "0.01235"},
		{9.9996, 4, "10.00"},
		{9999.6, 4, "10000"},
		{99999.6, 4, "100000"},
		{48.888, 17, "48.888000000000000"},
		{5e-324, 4, "5.000e-324"},
		{math.MaxFloat64, 4, "1.798e308"},
		{-2.5e-7, 2, "-2.5e-7"},
		{9.96e-5, 2, "1.0e-4"},
		{9.96e-5, 1, "1e-4"},
	} {
		if got := Format(row.x, row.figures); got != row.want {
			t.Errorf("%v with %d figures is %s, want %s", row.x, row.figures, got, row.want)
		}
	}
}

func TestSplitExponent(t *testing.T) {
	for _, row := range []struct{ text, mantissa, exponent string }{
		{"6.036e-4", "6.036", "-4"}, {"1.000e6", "1.000", "6"}, {"48.89", "48.89", ""}, {"0", "0", ""}, {"-2.5e-7", "-2.5", "-7"},
		{"2.1E5", "2.1", "5"}, {"1.5e+3", "1.5", "3"}, {"1.00, equal", "1.00, equal", ""}, {"equal", "equal", ""}, {"", "", ""},
	} {
		if m, e := SplitExponent(row.text); m != row.mantissa || e != row.exponent {
			t.Errorf("%s is %s and %s", row.text, m, e)
		}
	}
}

func TestTypeset(t *testing.T) {
	for _, row := range []struct{ text, want string }{
		{"48.89", "48.89"}, {"-3", "−3"}, {"6.036e-4", "6.036×10⁻⁴"}, {"-2.1E5", "−2.1×10⁵"}, {"1.5e+12", "1.5×10¹²"},
		{"-1 1/2", "−1 1/2"}, {"1.00, equal", "1.00, equal"}, {"", ""},
	} {
		if got := Typeset(row.text); got != row.want {
			t.Errorf("%s is set %s, want %s", row.text, got, row.want)
		}
	}
}

// The oracle rounds the shortest decimal exactly, in math/big, and applies the notation's words one by one.
func TestFormatAgainstBig(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		mantissa := rapid.Float64Range(-10, 10).Draw(t, "mantissa")
		x := mantissa * math.Pow(10, float64(rapid.IntRange(-8, 9).Draw(t, "power")))
		if rapid.Bool().Draw(t, "short") { // few digits, so that halves occur
			x, _ = strconv.ParseFloat(strconv.FormatFloat(x, 'e', 4, 64), 64)
		}
		figures := rapid.IntRange(1, 9).Draw(t, "figures")
		got := Format(x, figures)
		if x == 0 {
			if got != "0" {
				t.Fatalf("zero is %s", got)
			}
			return
		}
		exact, _ := new(big.Rat).SetString(strconv.FormatFloat(x, 'g', -1, 64))
		decimals := decimalsFor(exact, figures)
		fixed := roundHalfAway(exact, decimals)
		if size := new(big.Rat).Abs(fixed); size.Cmp(big.NewRat(1, 1000)) >= 0 && size.Cmp(big.NewRat(1000000, 1)) < 0 {
			// after rounding up to a power of ten one decimal fewer has the figures
			want := fixed.FloatString(max(0, min(decimals, decimalsFor(fixed, figures))))
			if got != want {
				t.Fatalf("%v with %d figures is %s, want %s", x, figures, got, want)
			}
			return
		}
		m, e := SplitExponent(got)
		power, err := strconv.Atoi(e)
		if err != nil || len(strings.Trim(strings.Replace(m, ".", "", 1), "-")) != figures {
			t.Fatalf("%v with %d figures is %s", x, figures, got)
		}
		value, _ := new(big.Rat).SetString(got)
		if want := roundHalfAway(exact, figures-1-leading(exact)); value.Cmp(want) != 0 || leading(value) != power {
			t.Fatalf("%v with %d figures is %s, want %s", x, figures, got, want.FloatString(12))
		}
	})
}

// leading returns the power of ten of r's first digit.
func leading(r *big.Rat) int {
	size := new(big.Rat).Abs(r)
	n := 0
	for ; size.Cmp(big.NewRat(10, 1)) >= 0; n++ {
		size.Quo(size, big.NewRat(10, 1))
	}
	for ; size.Cmp(big.NewRat(1, 1)) < 0; n-- {
		size.Mul(size, big.NewRat(10, 1))
	}
	return n
}

func decimalsFor(r *big.Rat, figures int) int { return max(0, figures-1-leading(r)) }

// roundHalfAway rounds to a number of decimals, which may be negative.
func roundHalfAway(r *big.Rat, decimals int) *big.Rat {
	scale := new(big.Rat).SetInt(new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(max(decimals, -decimals))), nil))
	if decimals < 0 {
		scale.Inv(scale)
	}
	scaled := new(big.Rat).Mul(new(big.Rat).Abs(r), scale)
	scaled.Add(scaled, big.NewRat(1, 2))
	whole := new(big.Rat).SetInt(new(big.Int).Quo(scaled.Num(), scaled.Denom()))
	if r.Sign() < 0 {
		whole.Neg(whole)
	}
	return whole.Quo(whole, scale)
}
