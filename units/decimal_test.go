package units

import (
	"math/big"
	"testing"

	"pgregory.net/rapid"
)

// The short way to SI gives the same float64 as the exact one.
func TestDecimalToSI(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		mant := rapid.Int64Range(0, 999_999_999_999).Draw(t, "mant")
		exp := rapid.IntRange(-14, 14).Draw(t, "exp")
		u, err := Parse(rapid.SampledFrom([]string{"", "mm", "kN", "MPa", "in", "kip", "kN*m", "mm^4", "deg", "psi", "%", "degC", "ft"}).Draw(t, "unit"))
		if err != nil {
			u = Unit{}
		}
		got, ok := u.DecimalToSI(mant, exp)
		if !ok {
			return
		}
		r := new(big.Rat).SetInt64(mant)
		ten := new(big.Rat).SetInt(new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(max(exp, -exp))), nil))
		if exp < 0 {
			r.Quo(r, ten)
		} else {
			r.Mul(r, ten)
		}
		if want := u.LiteralToSI(r); got != want {
			t.Fatalf("%d e%d %s: got %g, want %g", mant, exp, u, got, want)
		}
	})
	if got, ok := MustParse("mm").DecimalToSI(25, 0); !ok || got != 0.025 {
		t.Errorf("25 mm: %g %v", got, ok)
	}
}
