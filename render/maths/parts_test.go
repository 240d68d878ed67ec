package maths

import (
	"testing"

	"gusset/render/fonts"
)

// The quick estimate never takes a formula for narrower than it is set, or a
// part would run out of its column unmeasured.
func TestEmsIsUpperBound(t *testing.T) {
	check := func(name string, n Node) {
		if n == nil {
			return
		}
		list := atoms(nil, n)
		s := setter{size: 1, text: fonts.Serif, metrics: fonts.MathMetrics()}
		if set, most := s.row(Row(list), style{display: true}).width, ems(list); set > most {
			t.Errorf("%s is %.2f ems wide, over the estimate of %.2f: %s", name, set, most, AppendPlain(nil, n))
		}
	}
	for _, c := range writerCases {
		if c.name == "escapes" {
			continue // no text at all
		}
		check(c.name, c.chain.Left)
		for _, s := range c.chain.Steps {
			check(c.name, s.Right)
		}
	}
	for _, c := range long() {
		check("long", c.Left)
		for _, s := range c.Steps {
			check("long", s.Right)
		}
	}
}
