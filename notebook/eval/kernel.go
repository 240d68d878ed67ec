package eval

import (
	"math"
	"sort"

	"gusset/notebook/syntax"
)

// The functions below compute one entry. Both evaluators use them, so that a
// plain value and an entry of a column cannot differ. A result that does not
// exist is NaN: whoever asked finds out why and reports it.

// Tolerances of the notation: comparisons, and the roundings up and down,
// forgive a relative 1e-9; a sum below 1e-12 of its largest term is zero.
const (
	closeTo = 1e-9
	dust    = 1e-12
)

var nan = math.NaN()

// finite tells a number from an infinity and from NaN.
func finite(x float64) bool { return x-x == 0 }

// same tells whether two numbers are equal within the tolerance of comparisons.
func same(a, b float64) bool {
	return a == b || math.Abs(a-b) <= closeTo*math.Max(math.Abs(a), math.Abs(b))
}

// compare tells whether `a op b` holds, within the tolerance.
func compare(op syntax.Op, a, b float64) bool {
	switch op {
	case syntax.Lt:
		return a < b && !same(a, b)
	case syntax.Le:
		return a <= b || same(a, b)
	case syntax.Gt:
		return a > b && !same(a, b)
	case syntax.Ge:
		return a >= b || same(a, b)
	case syntax.Eq:
		return same(a, b)
	}
	return !same(a, b)
}

func compareText(op syntax.Op, a, b string) bool { return (a == b) == (op == syntax.Eq) }

// settle is a sum free of the dust of rounding, largest being the largest magnitude of its terms.
func settle(sum, largest float64) float64 {
	if math.Abs(sum) < dust*largest {
		return 0
	}
	return sum
}

func divide(x, y float64) float64 {
	if y == 0 || !finite(y) || !finite(x) {
		return nan
	}
	return x / y
}

func power(x, y float64) float64 {
	switch {
	case !finite(x) || !finite(y):
		return nan
	case y == 2:
		return x * x
	case x == 0 && y < 0:
		return nan
	}
	return math.Pow(x, y)
}

// whole is the nearest whole number where x is one within the tolerance.
func whole(x float64) (float64, bool) {
	r := math.Round(x)
	return r, math.Abs(x-r) <= closeTo*math.Max(math.Abs(x), 1e-300)
}

func floor(x float64) float64 {
	if r, ok := whole(x); ok {
		return r
	}
	return math.Floor(x)
}

func ceil(x float64) float64 {
	if r, ok := whole(x); ok {
		return r
	}
	return math.Ceil(x)
}

// round rounds halves away from zero, a half within the tolerance included.
func round(x float64) float64 {
	if r, ok := whole(x); ok {
		return r
	}
	return math.Copysign(floor(math.Abs(x)+0.5), x)
}

// stepped rounds to a multiple of a step.
func stepped(f func(float64) float64) func(x, step float64) float64 {
	return func(x, step float64) float64 {
		if step <= 0 || !finite(step) || !finite(x) {
			return nan
		}
		return f(x/step) * step
	}
}

// The sine of π is 1.2e-16 only because π is rounded: what is below the
// rounding of the angle itself is zero.
func circular(f func(float64) float64) func(float64) float64 {
	return func(x float64) float64 {
		r := f(x)
		if math.Abs(r) <= 2.3e-16*math.Abs(x) && math.Abs(x) > 1 {
			return 0
		}
		return r
	}
}

var sin, cos = circular(math.Sin), circular(math.Cos)

func tan(x float64) float64 {
	c := cos(x)
	if c == 0 {
		return nan
	}
	if s := sin(x); s == 0 {
		return 0
	}
	return math.Tan(x)
}

// clamped forgives an argument that rounding has put just outside [-1, 1].
func clamped(f func(float64) float64) func(float64) float64 {
	return func(x float64) float64 {
		if a := math.Abs(x); a > 1 && a <= 1+closeTo {
			x = math.Copysign(1, x)
		}
		return f(x)
	}
}

// functions1 are the built-in functions of one argument.
var functions1 = map[string]func(float64) float64{
	"sqrt": math.Sqrt, "cbrt": math.Cbrt, "abs": math.Abs, "exp": math.Exp, "ln": math.Log, "log10": math.Log10,
	"sin": sin, "cos": cos, "tan": tan, "asin": clamped(math.Asin), "acos": clamped(math.Acos), "atan": math.Atan,
	"sinh": math.Sinh, "cosh": math.Cosh, "tanh": math.Tanh, "round": round, "floor": floor, "ceil": ceil,
}

// functions2 are those of two arguments.
var functions2 = map[string]func(x, y float64) float64{
	"atan2": math.Atan2, "hypot": math.Hypot, "min": math.Min, "max": math.Max,
	"round": stepped(round), "floor": stepped(floor), "ceil": stepped(ceil),
}

// apply computes a built-in function of its arguments.
func apply(fn string, args []float64) float64 {
	for _, a := range args {
		if !finite(a) {
			return nan
		}
	}
	if len(args) == 1 {
		return functions1[fn](args[0])
	}
	r := functions2[fn](args[0], args[1])
	for _, a := range args[2:] {
		r = functions2[fn](r, a)
	}
	return r
}

// reduce computes a reduction of the entries picked by at(0) … at(n-1).
func reduce(fn string, n int, at func(int) float64) float64 {
	if fn == "count" {
		return float64(n)
	}
	if n == 0 {
		return nan
	}
	out, largest := at(0), math.Abs(at(0))
	for i := 1; i < n; i++ {
		x := at(i)
		switch fn {
		case "sum", "mean":
			out += x
			largest = math.Max(largest, math.Abs(x))
		case "min":
			out = math.Min(out, x)
		case "max":
			out = math.Max(out, x)
		case "extreme":
			if a := math.Abs(x); a > math.Abs(out) && !same(a, math.Abs(out)) || x != x {
				out = x
			}
		}
	}
	switch fn {
	case "sum":
		out = settle(out, largest)
	case "mean":
		out = settle(out, largest) / float64(n)
	}
	if !finite(out) {
		return nan
	}
	return out
}

// steady tells that the points rise or fall steadily.
func steady(xs []float64) bool {
	falling := len(xs) > 1 && xs[len(xs)-1] < xs[0]
	for i := 1; i < len(xs); i++ {
		if (xs[i] > xs[i-1]) == falling || xs[i] == xs[i-1] {
			return false
		}
	}
	return true
}

// interpolate reads y off steady points at x; NaN where the table does not reach x.
func interpolate(xs, ys []float64, x float64) float64 {
	n := len(xs)
	if n == 0 || !finite(x) {
		return nan
	}
	falling := xs[n-1] < xs[0]
	at := sort.Search(n, func(i int) bool { return xs[i] >= x != falling || xs[i] == x })
	for i := max(at-1, 0); i <= min(at, n-1); i++ {
		if same(x, xs[i]) {
			return ys[i]
		}
	}
	if at == 0 || at == n {
		return nan
	}
	f := (x - xs[at-1]) / (xs[at] - xs[at-1])
	return ys[at-1] + f*(ys[at]-ys[at-1])
}
