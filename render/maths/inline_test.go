package maths

import (
	"strings"
	"testing"
)

// TestInline holds fractions in small text to one line, bracketed where the
// slash would take in more or less than the rule did.
func TestInline(t *testing.T) {
	a, b, c := Symbol{Head: "a"}, Symbol{Head: "b"}, Symbol{Head: "c"}
	half := Fraction{a, Number{Value: "2"}}
	for _, test := range []struct {
		node Node
		want string
	}{
		{half, "a/2"},
		{Fraction{Row{a, Op{"+", Bin}, b}, c}, "(a + b)/c"},
		{Fraction{a, Row{b, Beside, c}}, "a/(b·c)"},
		{Fraction{Row{a, Beside, b}, c}, "a·b/c"},
		{Row{b, Dot, half}, "b·a/2"},
		{Row{half, Beside, b}, "(a/2)·b"},
		{Row{half, Dot, b}, "(a/2)·b"},
		{Row{half, Op{"+", Bin}, b}, "a/2 + b"},
		{Row{half, Relation("<="), b}, "a/2 ≤ b"},
		{Paren(half), "(a/2)"},
		{Script{Base: Paren(half), Sup: Number{Value: "2"}}, "(a/2)²"},
		{Root{Body: half}, "√(a/2)"},
	} {
		if got := string(AppendPlain(nil, Inline(test.node))); got != test.want {
			t.Errorf("%s: got %s, want %s", AppendPlain(nil, test.node), got, test.want)
		}
	}
}

// TestParts parts what is too long for a line of running text between its
// conditions, then at commas inside of brackets, and never between a number
// and its unit.
func TestParts(t *testing.T) {
	mm := Unit{{Name: "mm", Num: 1, Den: 1}}
	length := func(s string) Node { return Number{Value: s, Unit: mm} }
	small := Call(Word{Text: "min"}, length("16"), length("8"))
	node := Row{small, Relation(">"), Number{Value: "0"}, And, length("2"), Relation(">="), Number{Value: "0"}}
	for _, test := range []struct {
		most int
		want []string
	}{
		{100, []string{"min(16 mm, 8 mm) > 0", "and 2 mm ≥ 0"}},
		{12, []string{"min(16 mm,", "8 mm)", "> 0", "and 2 mm", "≥ 0"}},
	} {
		var got []string
		for _, p := range Parts(node, func(n Node) bool { return len(AppendPlain(nil, n)) <= test.most }) {
			got = append(got, strings.TrimSpace(string(AppendPlain(nil, p.Node))))
		}
		if len(got) != len(test.want) {
			t.Errorf("at most %d: got %q, want %q", test.most, got, test.want)
			continue
		}
		for i := range got {
			if got[i] != test.want[i] {
				t.Errorf("at most %d: got %q, want %q", test.most, got, test.want)
			}
		}
	}
}
