package eval

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestUtilisationText(t *testing.T) {
	for _, c := range []struct {
		ratio     float64
		ok, equal bool
		want      string
	}{
		{0.3579, true, false, "0.36"},
		{0.35, true, false, "0.35"},
		{0.07, true, false, "0.07"}, // 0.07·100 is above 7 in double precision
		{0.29, true, false, "0.29"},
		{0.301, true, false, "0.31"},
		{0.9901, true, false, "1.00"},
		{1, true, false, "1.00"},
		{1 + 5e-10, true, false, "1.00"}, // equal within the tolerance of comparisons
		{1.2037, false, false, "1.21"},
		{1.0001, false, false, "1.01"},
		{1.000000002, false, false, "1.01"},
		{1, false, true, "1.00, equal"},
		{0, true, false, "0.00"},
		{1e-9, true, false, "0.01"},
		{1e-300, true, false, "0.01"},
		{99.999, false, false, "100.00"},
		{12345.678, false, false, "12345.68"},
		{999_999.991, false, false, "1000000.00"},
		{1e6, false, false, "1.00e6"},
		{5e11, false, false, "5.00e11"},
		{5.001e11, false, false, "5.01e11"},
		{9.991e11, false, false, "1.00e12"},
		{math.NaN(), true, false, ""},
		{math.NaN(), false, false, ""},
		{0.5, false, false, ""}, // another comparison of the chain failed
	} {
		if got := UtilisationText(c.ratio, c.ok, c.equal); got != c.want {
			t.Errorf("%v, ok %v, equal %v: got %q, want %q", c.ratio, c.ok, c.equal, got, c.want)
		}
	}
}

// The figure printed lies at most one hundredth above the ratio and never on
// the other side of 1 than the verdict.
func TestUtilisationTextNeverContradicts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		ratio := rapid.Float64Range(0, 1e6).Draw(t, "ratio")
		ok := ratio <= 1
		text := UtilisationText(ratio, ok, false)
		printed, err := strconv.ParseFloat(text, 64)
		if err != nil {
			t.Fatal(err)
		}
		if ok && printed > 1 || !ok && printed <= 1 {
			t.Fatalf("%v prints as %s", ratio, text)
		}
		if printed < ratio*(1-dust) || printed-ratio > 0.01+1e-9 {
			t.Fatalf("%v prints as %s, which is not rounded up", ratio, text)
		}
		if _, decimals, _ := strings.Cut(text, "."); len(decimals) < 2 {
			t.Fatalf("%v prints as %s", ratio, text)
		}
	})
}
