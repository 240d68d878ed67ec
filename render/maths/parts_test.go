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

// A bracket that is parted from its fellow is as tall as what stands between
// them; one round a line of text grows with nothing.
func TestPartedBracketsGrow(t *testing.T) {
	f := Fraction{Num: sym("a"), Den: sym("b")}
	list := inner(Script{Base: Paren(Row{f, Plus, sym("c")}), Sup: num("2")})
	body := boxOf(f)
	open, ok := list[0].(Fence)
	shut, scripted := list[len(list)-1].(Script)
	if !ok || !scripted {
		t.Fatalf("got %v", list)
	}
	for _, fence := range []Node{open, shut.Base} {
		reach := fence.(Fence).Body.(strut)
		if reach.up < body.ascent || reach.down < body.descent {
			t.Errorf("%v does not reach over %.2f and %.2f", fence, body.ascent, body.descent)
		}
	}
	if left, right := open.edges(); left != Open || right != Open {
		t.Errorf("the open bracket is of %v, %v", left, right)
	}
	if left, right := shut.edges(); left != Close || right != Close {
		t.Errorf("the closing bracket is of %v, %v", left, right)
	}
	if flat := inner(Paren(Row{sym("a"), Plus, sym("c")})); flat[0] != (Op{"(", Open}) {
		t.Errorf("got %v", flat)
	}
}
