package maths

import (
	"encoding/xml"
	"errors"
	"io"
	"strings"
	"testing"
	"unicode/utf8"

	"pgregory.net/rapid"
)

// tree draws a tree of all kinds of nodes; some are odd, as an error upstream
// might make them.
func tree(depth int) *rapid.Generator[Node] {
	text := rapid.SampledFrom([]string{"a", "F", "f", "τ", "grade", "x1", "", "<&>\"", "\xff\x00", "漢\U0001F600", strings.Repeat("long", 30)})
	ref := rapid.SampledFrom([]Ref{{}, {Target: "a"}, {Tip: "a < b"}, {Target: "\"", Tip: "\n", Governs: true}})
	unit := rapid.SampledFrom([]Unit{nil, {mm}, {mm2}, perM, {{Name: "s", Num: -1, Den: 1}}, {{Open: true, Name: "m", Num: 1, Den: 2, Close: true}}, {{Name: "°", Num: 1, Den: 1}}})
	leaf := rapid.Custom(func(t *rapid.T) Node {
		switch rapid.IntRange(0, 7).Draw(t, "leaf") {
		case 0:
			return Symbol{text.Draw(t, "head"), rapid.SliceOfN(text, 0, 2).Draw(t, "sub"), rapid.IntRange(0, 3).Draw(t, "primes"), ref.Draw(t, "ref")}
		case 1:
			return Number{rapid.SampledFrom([]string{"2", "-3.5", "6.036e-4", "1e12", "1 1/4", "", "-", "e"}).Draw(t, "value"), unit.Draw(t, "unit"), ref.Draw(t, "ref")}
		case 2:
			return unit.Draw(t, "unit")
		case 3:
			return Word{text.Draw(t, "word"), ref.Draw(t, "ref")}
		case 4:
			return Text{text.Draw(t, "text"), ref.Draw(t, "ref")}
		case 5:
			return rapid.SampledFrom([]Op{Plus, Minus, Dot, Cross, Slash, Beside, Comma, And, Or, Not, Relation("<="), {}}).Draw(t, "op")
		case 6:
			return Space(rapid.IntRange(-5, 40).Draw(t, "space"))
		}
		return nil
	})
	if depth == 0 {
		return leaf
	}
	in := rapid.Deferred(func() *rapid.Generator[Node] { return tree(depth - 1) })
	bracket := rapid.SampledFrom([]string{"(", ")", "[", "{", "|", "", "‖", "⌈", "§"})
	return rapid.Custom(func(t *rapid.T) Node {
		switch rapid.IntRange(0, 6).Draw(t, "kind") {
		case 0:
			return Row(rapid.SliceOfN(in, 0, 8).Draw(t, "row"))
		case 1:
			return Fraction{in.Draw(t, "num"), in.Draw(t, "den")}
		case 2:
			return Script{in.Draw(t, "base"), in.Draw(t, "sub"), in.Draw(t, "sup")}
		case 3:
			return Root{in.Draw(t, "body"), in.Draw(t, "index")}
		case 4:
			return Fence{bracket.Draw(t, "open"), in.Draw(t, "body"), bracket.Draw(t, "close")}
		case 5:
			branch := rapid.Custom(func(t *rapid.T) Branch {
				return Branch{in.Draw(t, "value"), in.Draw(t, "cond"), rapid.Bool().Draw(t, "taken")}
			})
			return Choice{rapid.SliceOfN(branch, 0, 3).Draw(t, "branches")}
		}
		return leaf.Draw(t, "leaf")
	})
}

func chain() *rapid.Generator[Chain] {
	return rapid.Custom(func(t *rapid.T) Chain {
		in := tree(4)
		step := rapid.Custom(func(t *rapid.T) Step {
			return Step{rapid.SampledFrom([]string{"=", "<=", "!=", ">"}).Draw(t, "sign"), in.Draw(t, "right")}
		})
		return Chain{in.Draw(t, "left"), rapid.SliceOfN(step, 0, 4).Draw(t, "steps")}
	})
}

// Whatever the tree, the boxes keep to the column, their text can be printed,
// and the markup is well formed and says the same each time.
func TestAnyTree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := chain().Draw(t, "chain")
		width := rapid.Float64Range(180, 500).Draw(t, "width")
		for _, b := range Break(c, pt, width) {
			for _, it := range b.Items {
				if it.Kind == Run && !utf8.ValidString(it.Text) {
					t.Fatalf("%q is no text", it.Text)
				}
				for _, r := range it.Text {
					if !it.Face.Has(r) {
						t.Fatalf("%s has no %q", it.Face.Name, r)
					}
				}
				if it.X+it.Width > width+1e-6 {
					t.Fatalf("%q ends at %.2f of %.2f", it.Text, it.X+it.Width, width)
				}
			}
		}
		html := string(AppendChain(nil, c, columnEms))
		if err := wellFormed(html); err != nil {
			t.Fatalf("%v: %s", err, html)
		}
		if again := string(AppendChain(nil, c, columnEms)); again != html {
			t.Fatalf("got %s, then %s", html, again)
		}
		AppendPlainChain(nil, c)
	})
}

func wellFormed(html string) error {
	d := xml.NewDecoder(strings.NewReader(html))
	for {
		if _, err := d.Token(); err != nil {
			if errors.Is(err, io.EOF) {
				return nil
			}
			return err
		}
	}
}

// A tree as deep as the notation allows is set, and does not take for ever: each
// kind of node must be set a bounded number of times for each level about it.
func TestDeepTrees(t *testing.T) {
	build := map[string]func(Node) Node{
		"fences":    func(n Node) Node { return Paren(Row{n, Plus, num("1")}) },
		"fractions": func(n Node) Node { return Row{num("1"), Plus, Fraction{num("1"), n}} },
		"roots":     func(n Node) Node { return Root{Body: Row{num("1"), Plus, n}} },
		"powers":    func(n Node) Node { return Script{Base: Paren(n), Sup: n} },
		"squares":   func(n Node) Node { return power(Paren(n), two) },
		"choices": func(n Node) Node {
			return Choice{[]Branch{{n, Row{sym("a"), Relation("<"), sym("b")}, true}, {num("1"), nil, false}}}
		},
	}
	for name, wrap := range build {
		var n Node = sym("x")
		depth := 100
		if name == "powers" {
			depth = 10 // twice as large with each level
		}
		for range depth {
			n = wrap(n)
		}
		lines := Break(Chain{sym("y"), []Step{eq(n)}}, pt, columnEms)
		if len(lines) == 0 || len(AppendMathML(nil, n)) < depth || len(AppendPlain(nil, n)) < depth {
			t.Errorf("%s: %d lines", name, len(lines))
		}
	}
}
