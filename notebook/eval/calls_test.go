package eval_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"gusset/notebook/eval"
)

// Every call that a value came from is kept for print, those in the arguments
// of another before it, each as it was run for the entry that is printed.
func TestCallsInArguments(t *testing.T) {
	tables := "```helper half\nx [force]\ny = x/2\ngives y\n```\n```helper most\nx [column of force]\nk = 1\ny = k*max(x)\ngives y\n```\n" +
		"```cases\ncase | N [kN]\nLC1 | 10\nLC2 | 20\n```\n"
	s := sound(t, tables+block(`
twice(x) = 2*x
plain  = half(half(half(8 kN)))
rows   = half(half(N))
mine   = half(twice(3 kN)) + twice(half(6 kN))
column = most(half(N), half(4 kN)/(1 kN))
choice = first of 6 kN, 8 kN with half(half(choice)) >= 2 kN
`))
	for name, want := range map[string]string{
		"plain":  "half 4, half 2, half 1",
		"rows":   "half 10 (LC2), half 5 (LC2)",
		"mine":   "twice 6, half 3, half 3, twice 6",
		"column": "half 2, most 20",
		"choice": "half 3, half 1.5, half 4, half 2",
	} {
		var got []string
		for _, c := range find(s, name).Calls {
			got = append(got, callText(c))
		}
		if list := strings.Join(got, ", "); list != want {
			t.Errorf("%s:\ngot  %s\nwant %s", name, list, want)
		}
	}
}

func callText(c *eval.Call) string {
	results := c.Results
	if c.Helper == nil {
		results = c.Steps
	}
	text := fmt.Sprintf("%s %g", c.Expr.Fun.ID, results[0].Value.Num[0]/1000)
	if c.Mark != "" {
		text += " (" + c.Mark + ")"
	}
	return text
}

// A check over rows keeps the calls of the entry that governs: those that say
// when it is needed, and where it is, those of its sides.
func TestCallsOfConditionalCheck(t *testing.T) {
	s := sound(t, "```helper double\na [length]\nb = 2*a\ngives b\n```\n```helper triple\na [length]\nb = 3*a\ngives b\n```\n"+
		"```schedule s\nmark | x [mm]\nA | 7\nB | 8\n```\n"+
		block("x = 8 mm\ncheck triple(x) <= 30 mm if double(x) > 15 mm\ncheck triple(s.x) <= 30 mm if double(s.x) > 15 mm\ncheck triple(s.x) <= 30 mm if double(s.x) > 20 mm"))
	var got []string
	for _, step := range s.Steps {
		if step.Check != nil {
			var calls []string
			for _, c := range step.Calls {
				calls = append(calls, c.Helper.Name.ID+" "+text(c.Args[0], 0)+" "+c.Mark)
			}
			got = append(got, strings.Join(calls, ", "))
		}
	}
	want := []string{"double 8 mm , triple 8 mm ", "double 8 mm B, triple 8 mm B", "double 8 mm B"}
	if !slices.Equal(got, want) {
		t.Errorf("calls %q, want %q", got, want)
	}
}
