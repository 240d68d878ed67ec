package eval_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"gusset/notebook"
	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/eval"

	"pgregory.net/rapid"
)

// A statement over the rows of a schedule and of load cases is written with A, B
// and G for the columns of the schedule and N for that of the cases. It is
// computed for all rows at once, and for each pair of rows alone.

type pairRow struct {
	a, b float64
	g    string
}

var (
	pairRows  = []pairRow{{-1, 2, "S1"}, {3, 3.000000000001, "S2"}, {0, 0.5, "S1"}, {7, 1, "S3"}}
	pairCases = []float64{2, 0, 3}
)

// pairTables are there for both: what reduces rows and looks them up.
const pairTables = "```schedule s\nmark | a | b | g\nR1 | -1 | 2 | S1\nR2 | 3 | 3.000000000001 | S2\nR3 | 0 | 0.5 | S1\nR4 | 7 | 1 | S3\n```\n" +
	"```schedule steels\nmark | f | k\nS1 | 2 | A\nS2 | 3 | B\n```\n" +
	"```schedule curve\nx | y\n-2 | 5\n0 | 1\n4 | 3\n```\n" +
	"```helper ramp\nx [number]\ny [number]\nneeds y < 8\nr = x/y if x > y\n  = x*y otherwise\ngives r\n```\n" +
	"```helper spread\nx [column of number]\nf [number]\nneeds f*max(x) < 40\nr = f*max(x) - min(x*f)\ngives r\n```\n"

const pairFunctions = "c = 1.5\nchosen(x, y) = x - y if x > y\n  = x/y otherwise\nscaled(x) = x*max(s.a*s.b)\nfixed(x) = 5\n" +
	"strength(m) = steels.f at m\nmixed(m, x) = steels.f at m if x > 1\n  = x*sum(s.b) otherwise\n" +
	"by(m, x) = x/max(s.a) if m == \"A\"\n  = x + min(s.b) if x > 0\n  = 2 otherwise\nkind(m, x) = m if x > 0\n  = steels.k at m otherwise\n"

func pairValue(t *rapid.T, depth int) string {
	if depth == 0 || rapid.IntRange(0, 4).Draw(t, "leaf") == 0 {
		return rapid.SampledFrom([]string{"A", "B", "N", "c", "0", "1", "3", "max(s.a)", "sum(s.a*s.b)"}).Draw(t, "value")
	}
	sub := func() string { return pairValue(t, depth-1) }
	switch op := rapid.IntRange(0, 19).Draw(t, "op"); op {
	case 0, 1, 2, 3:
		return arithmetic(op, sub)
	case 4:
		return "sqrt(" + sub() + ")"
	case 5:
		return "max(" + sub() + ", " + sub() + ")"
	case 6:
		return "(" + sub() + ")^2"
	case 7:
		return "chosen(" + sub() + ", " + sub() + ")"
	case 8:
		return "scaled(" + sub() + ")"
	case 9:
		return "fixed(" + pairValue(t, 0) + ")"
	case 10:
		return rapid.SampledFrom([]string{"strength(G)", "(steels.f at G)"}).Draw(t, "look")
	case 11:
		return "mixed(G, " + sub() + ")"
	case 12:
		return "interpolate(curve.x, curve.y, " + sub() + ")"
	case 13:
		return "ramp(" + sub() + ", " + sub() + ")"
	case 14:
		return "spread(curve.y, " + sub() + ")"
	case 15:
		return "max(s.a*c)*" + sub()
	case 16:
		return "min(s.a/s.b + 1)"
	case 17:
		return "by((steels.k at G), " + sub() + ")"
	case 18:
		return "by(kind(G, " + sub() + "), " + sub() + ")"
	}
	return "ceil(" + sub() + ")"
}

func pairCondition(t *rapid.T, depth int) string {
	value := func() string { return pairValue(t, rapid.IntRange(0, 2).Draw(t, "depth")) }
	most := 6
	if depth == 0 {
		most = 3
	}
	switch rapid.IntRange(0, most).Draw(t, "condition") {
	case 0, 1:
		return value() + rapid.SampledFrom([]string{" < ", " <= ", " > ", " >= ", " == ", " != "}).Draw(t, "sign") + value()
	case 2:
		sign := rapid.SampledFrom([]string{" <= ", " < "}).Draw(t, "sign")
		return value() + sign + value() + sign + value()
	case 3:
		return rapid.SampledFrom([]string{`G == "S1"`, `G != "S2"`, `(steels.k at G) == "A"`, `kind(G, B - 1) == "S1"`}).Draw(t, "text")
	case 4:
		return "not (" + pairCondition(t, depth-1) + ")"
	case 5:
		return "(" + pairCondition(t, depth-1) + ") and (" + pairCondition(t, depth-1) + ")"
	}
	return "(" + pairCondition(t, depth-1) + ") or (" + pairCondition(t, depth-1) + ")"
}

var (
	overRows  = strings.NewReplacer("A", "s.a", "B", "s.b", "G", "s.g", "N", "n", `"A"`, `"A"`)
	overPlain = strings.NewReplacer("A", "a", "B", "b", "G", "g", "N", "n", `"A"`, `"A"`)
)

func wholePairs(statement string) *notebook.Sheet {
	cases := "```cases\ncase | n\n"
	for i, n := range pairCases {
		cases += fmt.Sprintf("L%d | %g\n", i+1, n)
	}
	return compileText(block(pairFunctions+overRows.Replace(statement)), pairTables+cases)
}

func onePair(statement string, r pairRow, n float64) *notebook.Sheet {
	given := fmt.Sprintf("a = %.15g\nb = %.15g\ng = %q\nn = %g\n", r.a, r.b, r.g, n)
	return compileText(pairTables+block(given+pairFunctions+overPlain.Replace(statement)), "")
}

// lastStep is the step of the statement, and the id of the error that it failed with.
func lastStep(s *notebook.Sheet) (*eval.Step, string) {
	step := s.Steps[len(s.Steps)-1]
	for _, d := range s.Diagnostics {
		if d.Severity == diag.Error {
			return step, d.ID
		}
	}
	return step, ""
}

func pairEntry(t check.Type, row, pair int) int {
	at := 0
	for _, r := range t.Rows {
		if r.Name == "s" {
			at = at*r.N() + row
		} else {
			at = at*r.N() + pair
		}
	}
	return at
}

// agreePairs compares a statement over rows with what each pair gives alone.
func agreePairs(t *rapid.T, statement string, same func(whole, alone *eval.Step, entry int) string) {
	whole, id := lastStep(wholePairs(statement))
	failed := map[string]bool{}
	for i, r := range pairRows {
		for k, n := range pairCases {
			alone, fault := lastStep(onePair(statement, r, n))
			failed[fault] = true
			switch {
			case fault == diag.Internal || (fault != "" && id == ""):
				t.Fatalf("%s\nfails alone with %s at R%d, L%d, but over rows with %q", statement, fault, i+1, k+1, id)
			case fault != "" || id != "":
				continue
			}
			typ := whole.Value.Type
			if whole.Check != nil {
				typ = whole.Check.Type
			}
			if differ := same(whole, alone, pairEntry(typ, i, k)); differ != "" {
				t.Fatalf("%s\nR%d, L%d: %s", statement, i+1, k+1, differ)
			}
		}
	}
	if !failed[id] {
		t.Fatalf("%s\nfails over rows with %s, and in no row alone", statement, id)
	}
}

func differ(x, y float64) bool {
	return math.IsNaN(x) != math.IsNaN(y) || math.Abs(x-y) > 1e-12*math.Max(math.Abs(x), math.Abs(y))
}

// A check over rows, which is computed by column, has in each row the verdict
// and the utilisation of the row alone; where one fails, so does the other.
func TestChecksOverRowsAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := func() string { return pairValue(t, 2) }
		sign := rapid.SampledFrom([]string{" <= ", " < ", " >= ", " > "}).Draw(t, "sign")
		s := "check " + v() + sign + v()
		if rapid.Bool().Draw(t, "chain") {
			s += sign + v()
		}
		if rapid.Bool().Draw(t, "if") {
			s += " if " + pairCondition(t, 1)
		}
		agreePairs(t, s, func(whole, alone *eval.Step, e int) string {
			w, a := whole.Check, alone.Check
			if w.Required[e] != a.Required[0] || w.OK[e] != a.OK[0] || differ(w.Ratio[e], a.Ratio[0]) {
				return fmt.Sprintf("required %t, ok %t, ratio %g over rows; alone %t, %t, %g", w.Required[e], w.OK[e], w.Ratio[e], a.Required[0], a.OK[0], a.Ratio[0])
			}
			return ""
		})
	})
}

// So has a value by conditions.
func TestChoicesOverRowsAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := "q = " + pairValue(t, 2) + " if " + pairCondition(t, 2) + "\n  = " + pairValue(t, 2) + " if " + pairCondition(t, 2)
		if rapid.Bool().Draw(t, "otherwise") {
			s += "\n  = " + pairValue(t, 3) + " otherwise"
		}
		agreePairs(t, s, func(whole, alone *eval.Step, e int) string {
			if differ(whole.Value.Num[e], alone.Value.Num[0]) || whole.Taken[e] != alone.Taken[0] {
				return fmt.Sprintf("%g, branch %d over rows; alone %g, branch %d", whole.Value.Num[e], whole.Taken[e], alone.Value.Num[0], alone.Taken[0])
			}
			return ""
		})
	})
}
