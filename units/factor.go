package units

import (
	"math"
	"math/big"
	"math/bits"
)

// factor is a unit's factor to SI: an exact rational times a power of π. Rationals whose parts
// float64 holds exactly, which are nearly all, live in two machine words; the rest in a big.Rat.
type factor struct {
	num, den   uint64   // at most exactLimit; unused where rat is set
	rat        *big.Rat // never changed once set
	pi         int
	irrational bool // rat is then a close approximation (a root that is no rational)
}

// exactLimit is the largest magnitude up to which float64 holds every whole number.
const exactLimit = 1 << 53

// piRat is π to 60 decimals, far beyond what a float64 needs.
var piRat, _ = new(big.Rat).SetString("3.141592653589793238462643383279502884197169399375105820974944")

var factorOne = factor{num: 1, den: 1}

func newFactor(r *big.Rat, pi int) factor {
	if r.Num().IsUint64() && r.Denom().IsUint64() {
		n, d := r.Num().Uint64(), r.Denom().Uint64()
		if n <= exactLimit && d <= exactLimit {
			return factor{num: n, den: d, pi: pi}
		}
	}
	return factor{rat: r, pi: pi}
}

// big returns the rational part. It must not be changed.
func (f factor) big() *big.Rat {
	if f.rat != nil {
		return f.rat
	}
	n, d := new(big.Int).SetUint64(f.num), new(big.Int).SetUint64(f.den)
	return new(big.Rat).SetFrac(n, d)
}

func (f factor) inverse() factor {
	f.pi = -f.pi
	if f.rat != nil {
		f.rat = new(big.Rat).Inv(f.rat)
	} else {
		f.num, f.den = f.den, f.num
	}
	return f
}

func (f factor) mul(g factor) factor {
	if f.rat == nil && g.rat == nil {
		a, b := gcd(f.num, g.den), gcd(g.num, f.den)
		n, nOK := smallProduct(f.num/a, g.num/b)
		d, dOK := smallProduct(f.den/b, g.den/a)
		if nOK && dOK {
			return factor{num: n, den: d, pi: f.pi + g.pi}
		}
	}
	h := newFactor(new(big.Rat).Mul(f.big(), g.big()), f.pi+g.pi)
	if f.irrational || g.irrational {
		h.rat, h.irrational = approximate(h.big()), true
	}
	return h
}

func smallProduct(a, b uint64) (uint64, bool) {
	hi, lo := bits.Mul64(a, b)
	return lo, hi == 0 && lo <= exactLimit
}

// pow raises f to num/den. A root that is no rational is approximated to some forty figures.
func (f factor) pow(num, den int) factor {
	if num == 1 && den == 1 {
		return f
	}
	if den > 1 {
		f = f.root(den)
	}
	if num < 0 {
		f, num = f.inverse(), -num
	}
	result := factorOne
	for {
		if num&1 == 1 {
			result = result.mul(f)
		}
		if num >>= 1; num == 0 {
			return result
		}
		f = f.mul(f)
	}
}

func (f factor) root(q int) factor {
	r := f.big()
	if f.pi%q != 0 { // a root of π: fold it into the approximation
		r, f.pi, f.irrational = new(big.Rat).Mul(r, piPower(f.pi)), 0, true
	}
	if !f.irrational {
		n, nExact := integerRoot(r.Num(), q)
		d, dExact := integerRoot(r.Denom(), q)
		if nExact && dExact {
			return newFactor(new(big.Rat).SetFrac(n, d), f.pi/q)
		}
	}
	return factor{rat: approximateRoot(r, q), pi: f.pi / q, irrational: true}
}

// approximate rounds to approximatePrec bits, so that products of approximations do not grow.
func approximate(r *big.Rat) *big.Rat {
	rounded, _ := new(big.Float).SetPrec(approximatePrec).SetRat(r).Rat(nil)
	return rounded
}

// approximatePrec is three times what a float64 holds.
const approximatePrec = 160

// approximateRoot returns r^(1/q) by Newton's method: x ← x + x·(r/x^q - 1)/q. It starts from a
// float64, whose 50 good bits double at each step.
func approximateRoot(r *big.Rat, q int) *big.Rat {
	float := func() *big.Float { return new(big.Float).SetPrec(approximatePrec + 32) }
	want := float().SetRat(r)
	x := float().SetFloat64(math.Pow(ratFloat(r), 1/float64(q)))
	for range 3 {
		power := float().SetInt64(1)
		for range q {
			power.Mul(power, x)
		}
		step := float().Quo(want, power)
		step.Sub(step, float().SetInt64(1)).Quo(step, float().SetInt64(int64(q)))
		x.Add(x, step.Mul(step, x))
	}
	root, _ := x.Rat(nil)
	return approximate(root)
}

// integerRoot returns the whole part of the q-th root of n, by Newton's method from above, and
// whether the root is exact.
func integerRoot(n *big.Int, q int) (*big.Int, bool) {
	if n.Sign() == 0 {
		return new(big.Int), true
	}
	bigQ, less1 := big.NewInt(int64(q)), big.NewInt(int64(q-1))
	x := new(big.Int).Lsh(big.NewInt(1), uint(n.BitLen()/q+1))
	for {
		// y = ((q-1)·x + n/x^(q-1)) / q
		y := new(big.Int).Exp(x, less1, nil)
		y.Quo(n, y)
		y.Add(y, new(big.Int).Mul(less1, x)).Quo(y, bigQ)
		if y.Cmp(x) >= 0 {
			break
		}
		x = y
	}
	return x, new(big.Int).Exp(x, bigQ, nil).Cmp(n) == 0
}

func piPower(n int) *big.Rat {
	p := big.NewRat(1, 1)
	for i := n; i != 0; i -= sign(n) {
		p.Mul(p, piRat)
	}
	if n < 0 {
		p.Inv(p)
	}
	return p
}

func sign(n int) int {
	if n < 0 {
		return -1
	}
	return 1
}

// pair is a real number as the unrounded sum of two floats, good to some 32 figures.
type pair struct{ hi, lo float64 }

// pair returns the factor as a pair.
func (f factor) pair() pair {
	if f.rat == nil && f.pi == 0 {
		n, d := float64(f.num), float64(f.den)
		hi := n / d
		return pair{hi, math.FMA(-hi, d, n) / d} // the remainder is exact
	}
	return ratPair(new(big.Rat).Mul(f.big(), piPower(f.pi)))
}

func ratPair(r *big.Rat) pair {
	hi, exact := r.Float64()
	if exact || math.IsInf(hi, 0) {
		return pair{hi, 0}
	}
	return pair{hi, ratFloat(new(big.Rat).Sub(r, new(big.Rat).SetFloat64(hi)))}
}

// times multiplies and rounds once.
func (p pair) times(x float64) float64 {
	if p.lo == 0 || math.IsInf(x, 0) {
		return x * p.hi
	}
	return math.FMA(x, p.hi, x*p.lo)
}

// timesPlus multiplies, adds and rounds once, by carrying what product and sum lose.
func (p pair) timesPlus(x float64, q pair) float64 {
	product := x * p.hi
	productLoss := math.FMA(x, p.hi, -product)
	sum := product + q.hi
	if math.IsInf(sum, 0) || math.IsNaN(sum) {
		return sum
	}
	// Knuth's two-sum
	part := sum - product
	sumLoss := (product - (sum - part)) + (q.hi - part)
	return sum + (sumLoss + productLoss + x*p.lo + q.lo)
}

// scale returns r times the factor, rounded once.
func (f factor) scale(r *big.Rat) float64 {
	if f.rat == nil && f.pi == 0 && r.Num().IsInt64() && r.Denom().IsUint64() {
		a := r.Num().Int64()
		n, nOK := smallProduct(magnitude(a), f.num)
		d, dOK := smallProduct(r.Denom().Uint64(), f.den)
		if nOK && dOK { // both exact, so the one division is the one rounding
			if a < 0 {
				return -float64(n) / float64(d)
			}
			return float64(n) / float64(d)
		}
	}
	return ratFloat(new(big.Rat).Mul(r, new(big.Rat).Mul(f.big(), piPower(f.pi))))
}

func ratFloat(r *big.Rat) float64 {
	x, _ := r.Float64()
	return x
}
