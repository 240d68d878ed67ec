package eval_test

import (
	"fmt"
	"math"
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// expression draws a random expression of plain numbers over the names a, b
// and c. Only + - * and / stand in it where exact is set.
func expression(t *rapid.T, depth int, exact bool) string {
	if depth == 0 || rapid.IntRange(0, 4).Draw(t, "leaf") == 0 {
		switch rapid.IntRange(0, 3).Draw(t, "kind") {
		case 0:
			return fmt.Sprint(rapid.IntRange(0, 9).Draw(t, "n"))
		case 1:
			return "a"
		case 2:
			return "b"
		}
		return "c"
	}
	sub := func() string { return expression(t, depth-1, exact) }
	most := 14
	if exact {
		most = 4
	}
	switch op := rapid.IntRange(0, most).Draw(t, "op"); op {
	case 0, 1, 2, 3:
		return arithmetic(op, sub)
	case 4:
		return "-(" + sub() + ")"
	case 5:
		return "abs(" + sub() + ")"
	case 6:
		return "sqrt(abs(" + sub() + "))"
	case 7:
		return "max(" + sub() + ", " + sub() + ")"
	case 8:
		return "min(" + sub() + ", " + sub() + ", 3)"
	case 9:
		return "sin((" + sub() + ")*1 rad)"
	case 10:
		return "(" + sub() + ")^2"
	case 11:
		return "ceil(" + sub() + ")"
	case 12:
		return "atan2(" + sub() + ", " + sub() + ")"
	case 13:
		return "f(" + sub() + ", " + sub() + ")"
	}
	return "hypot(" + sub() + ", " + sub() + ")"
}

var letters = []float64{-2.5, -1, 0, 0.125, 1, 3, 7.25}

// A value over rows, computed by the column evaluator, has in each row what
// govaluate makes of the row alone; where one fails, so does the other.
func TestColumnsAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := expression(t, 4, false)
		cond := expression(t, 2, false)
		table := "```schedule s\nmark | a | b\n"
		for i, v := range letters {
			table += fmt.Sprintf("R%d | %g | %g\n", i, v, letters[len(letters)-1-i])
		}
		const f = "f(x, y) = x - y if x > y\n  = x*y otherwise\n"
		rowsText := strings.NewReplacer("a", "s.a", "b", "s.b").Replace
		whole := compileText(block("c = 1.5\n"+f+"q = "+names(x, rowsText)+" if "+names(cond, rowsText)+" > 1\n  = s.a otherwise"), table)
		q := find(whole, "q")
		for i, v := range letters {
			alone := compileText(block(fmt.Sprintf("a = %g\nb = %g\nc = 1.5\n%sq = %s if %s > 1\n  = a otherwise", v, letters[len(letters)-1-i], f, x, cond)), "")
			p := find(alone, "q")
			if q.Failed {
				continue // one row of the column failed; the test below finds it
			}
			if p.Failed {
				t.Fatalf("%s if %s: row %d fails alone, but not in the column", x, cond, i)
			}
			k := 0
			if len(q.Value.Type.Rows) > 0 {
				k = i
			}
			if got, want := q.Value.Num[k], p.Value.Num[0]; math.Abs(got-want) > 1e-12*math.Max(math.Abs(got), math.Abs(want)) {
				t.Fatalf("%s if %s: row %d is %g in the column, %g alone", x, cond, i, got, want)
			}
		}
		if q.Failed {
			any := false
			for i, v := range letters {
				alone := compileText(block(fmt.Sprintf("a = %g\nb = %g\nc = 1.5\n%sq = %s if %s > 1\n  = a otherwise", v, letters[len(letters)-1-i], f, x, cond)), "")
				any = any || find(alone, "q").Failed
			}
			if !any {
				t.Fatalf("%s if %s: the column fails, but no row does alone", x, cond)
			}
		}
	})
}

// names rewrites the single-letter names of an expression, leaving those of functions.
func names(x string, rewrite func(string) string) string {
	var b strings.Builder
	for i := 0; i < len(x); i++ {
		letter := func(j int) bool {
			return j >= 0 && j < len(x) && (x[j] >= 'a' && x[j] <= 'z' || x[j] >= '0' && x[j] <= '9')
		}
		if (x[i] == 'a' || x[i] == 'b') && !letter(i-1) && !letter(i+1) {
			b.WriteString(rewrite(x[i : i+1]))
			continue
		}
		b.WriteByte(x[i])
	}
	return b.String()
}

// Arithmetic agrees with math/big, and a division by zero anywhere is an error
// that no later operation hides.
func TestArithmeticAgainstBig(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := expression(t, 5, true)
		a, b := rapid.SampledFrom(letters).Draw(t, "a"), rapid.SampledFrom(letters).Draw(t, "b")
		s := compileText(block(fmt.Sprintf("a = %g\nb = %g\nc = 1.5\nq = %s", a, b, x)), "")
		st := find(s, "q")
		p := &oracle{text: strings.ReplaceAll(x, " ", ""), names: map[byte]float64{'a': a, 'b': b, 'c': 1.5}}
		want, scale := p.sum()
		if p.undefined {
			if !st.Failed {
				t.Fatalf("%s: a division by zero inside is not reported, but gives %g", x, st.Value.Num[0])
			}
			return
		}
		if st.Failed {
			// A sum that is zero only by the rule on dust makes a division fail that is
			// possible with all figures.
			if p.dusty {
				return
			}
			t.Fatalf("%s: not computed", x)
		}
		exact, _ := want.Float64()
		if got := st.Value.Num[0]; !p.dusty && math.Abs(got-exact) > 1e-11*scale {
			t.Fatalf("%s: got %g, want %g", x, got, exact)
		}
	})
}

// oracle evaluates the exact expressions above with 300 bits; it returns
// beside each value the largest magnitude met, which the rounding of
// float64 is measured by.
type oracle struct {
	text      string
	at        int
	names     map[byte]float64
	undefined bool
	dusty     bool // a sum all but cancelled
}

func number(x float64) *big.Float { return new(big.Float).SetPrec(300).SetFloat64(x) }

func (p *oracle) peek() byte {
	if p.at < len(p.text) {
		return p.text[p.at]
	}
	return 0
}

func (p *oracle) sum() (*big.Float, float64) {
	x, scale := p.product()
	largest := math.Abs(float(x))
	for p.peek() == '+' || p.peek() == '-' {
		op := p.peek()
		p.at++
		y, s := p.product()
		largest = math.Max(largest, math.Abs(float(y)))
		if op == '+' {
			x = new(big.Float).SetPrec(300).Add(x, y)
		} else {
			x = new(big.Float).SetPrec(300).Sub(x, y)
		}
		scale = math.Max(math.Max(scale, s), largest)
	}
	if v := math.Abs(float(x)); v != 0 && v < 1e-9*largest {
		p.dusty = true
	}
	return x, scale
}

func (p *oracle) product() (*big.Float, float64) {
	x, scale := p.unary()
	for p.peek() == '*' || p.peek() == '/' {
		op := p.peek()
		p.at++
		y, s := p.unary()
		if op == '*' {
			x = new(big.Float).SetPrec(300).Mul(x, y)
			scale *= math.Max(s, 1)
		} else {
			if y.Sign() == 0 || p.undefined {
				p.undefined = true
				return number(1), 1
			}
			x = new(big.Float).SetPrec(300).Quo(x, y)
			scale = math.Max(scale, 1) * math.Max(s, 1) / math.Min(math.Abs(float(y))*math.Abs(float(y)), 1)
		}
	}
	return x, math.Max(scale, math.Abs(float(x)))
}

func (p *oracle) unary() (*big.Float, float64) {
	switch c := p.peek(); {
	case c == '-':
		p.at++
		x, s := p.unary()
		return new(big.Float).SetPrec(300).Neg(x), s
	case c == '(':
		p.at++
		x, s := p.sum()
		p.at++
		return x, s
	case c >= '0' && c <= '9':
		p.at++
		return number(float64(c - '0')), float64(c - '0')
	default:
		p.at++
		return number(p.names[c]), math.Abs(p.names[c])
	}
}

func float(x *big.Float) float64 { f, _ := x.Float64(); return f }

// arithmetic joins two random expressions by one of the four operations.
func arithmetic(op int, sub func() string) string {
	switch op {
	case 0:
		return "(" + sub() + " + " + sub() + ")"
	case 1:
		return "(" + sub() + " - " + sub() + ")"
	case 2:
		return sub() + "*" + sub()
	}
	return "(" + sub() + ")/(" + sub() + ")"
}
