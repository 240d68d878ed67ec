package units

import (
	"fmt"
	"math/big"
	"strings"
)

// Convert turns an exact number in one unit into another. exact shows the rule without
// rounding: "1 kip = 4.4482216152605 kN", "1 deg = π/180 rad", "x degC = (9/5*x + 32) degF".
func Convert(x *big.Rat, from, to Unit) (value float64, exact string, err error) {
	if from.Dim() != to.Dim() {
		return 0, "", fmt.Errorf("`%s` is %s and `%s` is %s", from, from.article(), to, to.article())
	}
	if from.IsPoint() != to.IsPoint() {
		return 0, "", pointError(from, to)
	}
	f, g := from.get(), to.get()
	ratio := f.factor.mul(g.factor.inverse())
	if f.zero == nil {
		exact = "1"
		if from.String() != "" {
			exact += " " + from.String()
		}
		equals := " = "
		if ratio.irrational {
			equals = " "
		}
		exact += strings.TrimRight(equals+ratio.String()+" "+to.String(), " ")
		return ratio.scale(x), exact, nil
	}
	shift := new(big.Rat).Sub(f.zero, g.zero)
	shift.Quo(shift, g.factor.big())
	sum := new(big.Rat).Mul(x, ratio.big())
	sum.Add(sum, shift)
	return ratFloat(sum), pointRule(from, to, ratio, shift), nil
}

func pointRule(from, to Unit, ratio factor, shift *big.Rat) string {
	rule := "x"
	if r := ratio.String(); r != "1" {
		rule = r + "*x"
	}
	switch shift.Sign() {
	case 1:
		rule = "(" + rule + " + " + ratText(shift) + ")"
	case -1:
		rule = "(" + rule + " - " + ratText(new(big.Rat).Neg(shift)) + ")"
	}
	return fmt.Sprintf("x %s = %s %s", from, rule, to)
}

func pointError(from, to Unit) error {
	if from.IsPoint() {
		return fmt.Errorf("`%s` is a point of temperature and `%s` a difference", from, to)
	}
	return fmt.Errorf("`%s` is a temperature difference and `%s` a point", from, to)
}

func (u Unit) article() string {
	if u.IsPoint() {
		return "a temperature"
	}
	return u.Dim().Article()
}

// String writes the factor exactly: 0.0254, π/180, 5/9; a root that is no rational is rounded to 17
// figures and says so with ≈.
func (f factor) String() string {
	if f.irrational {
		r := new(big.Rat).Mul(f.big(), piPower(f.pi))
		return "≈ " + new(big.Float).SetPrec(120).SetRat(r).Text('g', 17)
	}
	r := f.big()
	if f.pi == 0 {
		return ratText(r)
	}
	pi := "π"
	if f.pi != 1 && f.pi != -1 {
		pi = "π^" + fmt.Sprint(magnitude(int64(f.pi)))
	}
	over, under := r.Num().String(), r.Denom().String()
	if f.pi > 0 {
		over = strings.TrimPrefix(over+"*"+pi, "1*")
	} else {
		under = strings.TrimPrefix(under+"*"+pi, "1*")
	}
	switch {
	case under == "1":
		return over
	case strings.Contains(under, "*"):
		return over + "/(" + under + ")"
	}
	return over + "/" + under
}

// maxDecimals is the longest decimal fraction that is written out; longer ones are fractions.
const maxDecimals = 24

// ratText writes a rational as a whole number or finite decimal fraction where it is one, else as a fraction.
func ratText(r *big.Rat) string {
	if n, finite := r.FloatPrec(); finite && n <= maxDecimals {
		return r.FloatString(n)
	}
	return r.RatString()
}
