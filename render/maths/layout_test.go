package maths

import (
	"math"
	"slices"
	"strings"
	"testing"

	"gusset/render/fonts"
)

const pt = 11.0

func one(t *testing.T, n Node) Box {
	t.Helper()
	lines := Break(Chain{Left: n}, pt, 1e6)
	if len(lines) != 1 {
		t.Fatalf("%d lines, want 1", len(lines))
	}
	return lines[0]
}

func find(t *testing.T, b Box, text string) Item {
	t.Helper()
	for _, it := range b.Items {
		if it.Kind == Run && it.Text == text {
			return it
		}
	}
	t.Fatalf("no %q among %d items", text, len(b.Items))
	return Item{}
}

func rules(b Box) (list []Item) {
	for _, it := range b.Items {
		if it.Kind == Rule {
			list = append(list, it)
		}
	}
	return list
}

func near(t *testing.T, what string, got, want float64) {
	t.Helper()
	if math.Abs(got-want) > 1e-6 {
		t.Errorf("%s: got %.4f, want %.4f", what, got, want)
	}
}

// The constants are those of the face (see the test of its MATH table), in
// thousandths of the size.
func TestFractionStandsOnTheAxis(t *testing.T) {
	b := one(t, Fraction{sym("P"), sym("A")})
	r := rules(b)[0]
	near(t, "middle of the rule", r.Y+r.Height/2, -0.262*pt)
	near(t, "thickness", r.Height, 0.066*pt)
	near(t, "numerator", find(t, b, "P").Y, -0.774*pt)
	near(t, "denominator", find(t, b, "A").Y, 0.698*pt)

	small := Layout(Fraction{sym("P"), sym("A")}, pt, fonts.Serif)
	near(t, "numerator in text", find(t, small, "P").Y, -0.516*pt)
	near(t, "its size", find(t, small, "P").Size, 0.65*pt)
}

func TestFractionKeepsItsGaps(t *testing.T) {
	b := one(t, Fraction{Fraction{sym("a"), sym("g")}, Fraction{sym("b"), sym("c")}})
	var outer Item
	for _, r := range rules(b) {
		if r.Width > outer.Width {
			outer = r
		}
	}
	_, low, _, _ := fonts.SerifItalic.Bounds(fonts.SerifItalic.Glyph('g'))
	g := find(t, b, "g")
	if gap := outer.Y - (g.Y - float64(low)*g.Size/1000); gap < 0.198*pt-1e-6 {
		t.Errorf("the numerator is %.3f above the rule, want %.3f at least", gap, 0.198*pt)
	}
}

func TestScripts(t *testing.T) {
	b := one(t, sym("τ", "d", "Rd"))
	near(t, "subscript", find(t, b, "d,Rd").Y, 0.2*pt)
	near(t, "its size", find(t, b, "d,Rd").Size, 0.65*pt)
	if f := find(t, b, "d,Rd").Face; f != fonts.Serif {
		t.Errorf("the subscript is in %s, italic %v", f.Name, f.Italic)
	}
	if f := find(t, b, "τ").Face; f != fonts.SerifItalic {
		t.Errorf("the quantity is in %s, italic %v", f.Name, f.Italic)
	}
	near(t, "superscript", find(t, one(t, power(sym("d"), two)), "2").Y, -0.477*pt)
	cramped := one(t, Root{Body: power(sym("d"), two)})
	near(t, "superscript under a root", find(t, cramped, "2").Y, -0.358*pt)

	both := one(t, power(sym("σ", "x"), two))
	sub, sup := find(t, both, "x"), find(t, both, "2")
	if sup.X > sub.X+0.1*pt {
		t.Errorf("the superscript stands at %.2f, behind the subscript at %.2f", sup.X, sub.X)
	}
	_, _, _, top := fonts.Serif.Bounds(fonts.Serif.Glyph('x'))
	if gap := (sub.Y - float64(top)*sub.Size/1000) - sup.Y; gap < 0.264*pt-1e-6 {
		t.Errorf("scripts are %.3f apart, want %.3f at least", gap, 0.264*pt)
	}
}

func TestSpacing(t *testing.T) {
	mu := pt / 18
	after := func(a, b Item) float64 { return b.X - a.X - a.Width }
	for _, c := range []struct {
		name        string
		n           Node
		left, right string
		want        float64
	}{
		{"binary", Row{num("1"), Plus, num("2")}, "1", "+", 4},
		{"relation", Row{num("1"), Relation("<="), num("2")}, "≤", "2", 5},
		{"comma", Row{num("1"), Comma, num("2")}, ",", "2", 3},
		{"before a comma", Row{num("1"), Comma, num("2")}, "1", ",", 0},
		{"sign", Row{Minus, num("2")}, "−", "2", 0},
		{"sign after a relation", Row{num("1"), Relation("="), Minus, num("2")}, "−", "2", 0},
		{"unwritten product", Row{num("1"), Beside, num("2")}, "1", "2", 3},
		{"unit", num("48", kN), "48", "kN", 3},
		{"degrees", num("30", term("", "°", 1)), "30", "°", 0},
		{"call", Call(Word{Text: "sin"}, num("2")), "sin", "(", 0},
		{"function after a factor", Row{num("2"), Word{Text: "sin"}}, "2", "sin", 3},
		{"word", Row{num("1"), And, num("2")}, "1", "and", 5},
	} {
		b := one(t, c.n)
		near(t, c.name, after(find(t, b, c.left), find(t, b, c.right)), c.want*mu)
	}
	b := one(t, power(sym("x"), Row{num("1"), Plus, num("2")}))
	near(t, "in a script", after(find(t, b, "1"), find(t, b, "+")), 0)
}

func TestNumberIsTypeset(t *testing.T) {
	b := one(t, num("-6.036e-4", mPa))
	var text []string
	for _, it := range b.Items {
		text = append(text, it.Text)
	}
	if got, want := strings.Join(text, " "), "−6.036 × 10 −4 MPa"; got != want {
		t.Errorf("got %s, want %s", got, want)
	}
	near(t, "the exponent's rise", find(t, b, "−4").Y, -0.477*pt)
}

// A unit that starts with a figure is told from the figures before it, and a
// sign of degrees from an exponent.
func TestUnitsStandClear(t *testing.T) {
	per, deg := Unit{{Name: "1", Num: 1}, {Sep: "/", Name: "m", Num: 1}}, Unit{{Name: "°", Num: 1}}
	for _, c := range []struct {
		n    Number
		want Space
	}{
		{Number{Value: "77.42", Unit: per}, Wide},
		{Number{Value: "1.2e-5", Unit: per}, Thin},
		{Number{Value: "77.42", Unit: Unit{mm}}, Thin},
		{Number{Value: "30", Unit: deg}, 0},
		{Number{Value: "1.5e-4", Unit: deg}, Thin},
		{Number{Value: "77.42"}, 0},
	} {
		if got := c.n.Gap(); got != c.want {
			t.Errorf("%s %s: got %d, want %d", c.n.Value, AppendPlain(nil, c.n.Unit), got, c.want)
		}
	}
	figures, unit := one(t, num("77.42")).Width, one(t, per).Width
	near(t, "whole", one(t, Number{Value: "77.42", Unit: per}).Width, figures+unit+float64(Wide)*pt/18)
}

func TestBracketsGrow(t *testing.T) {
	flat := one(t, Paren(sym("a")))
	for _, it := range flat.Items {
		if it.Kind == Outline {
			t.Error("a bracket about a letter is drawn and not text")
		}
	}
	var deep Node = sym("a")
	last := 0.0
	for i := range 12 {
		deep = Fraction{deep, Row{sym("b"), Plus, deep}}
		b := one(t, Paren(deep))
		first := b.Items[0]
		if first.Kind != Outline {
			t.Fatalf("level %d: the bracket is text", i)
		}
		top, bottom := extent(b.Items, first.X)
		body := one(t, deep)
		axis := 0.262 * pt
		if half := max(body.Ascent-axis, body.Descent+axis); -top-axis < half*0.8-0.01 || bottom+axis < half*0.8-0.01 {
			t.Errorf("level %d: the bracket reaches from %.1f to %.1f about a body from %.1f to %.1f", i, top, bottom, -body.Ascent, body.Descent)
		}
		near(t, "centre", (top+bottom)/2, -axis)
		if bottom-top < last {
			t.Errorf("level %d: the bracket shrinks", i)
		}
		last = bottom - top
		if i > 5 {
			break
		}
	}
}

// extent is how far the outlines that start at x reach.
func extent(items []Item, x float64) (top, bottom float64) {
	top, bottom = math.Inf(1), math.Inf(-1)
	for _, it := range items {
		if it.Kind != Outline || it.X != x {
			continue
		}
		for _, s := range it.Path {
			y := it.Y - s.P.Y*it.Size/1000
			top, bottom = min(top, y), max(bottom, y)
		}
	}
	return top, bottom
}

// What is taller than the largest bracket is put together from pieces that
// overlap, without a gap.
func TestAssembledBracketHasNoGap(t *testing.T) {
	s := setter{size: pt, text: fonts.Serif, metrics: fonts.MathMetrics()}
	for _, sign := range growing {
		for _, height := range []float64{60, 100, 500, 2000} {
			from := len(s.items)
			p := s.tall(sign, height, style{})
			if p.ascent < height-1e-6 {
				t.Errorf("%c is %.1f tall, want %.1f", sign, p.ascent, height)
			}
			if p.ascent > height*1.02+30 {
				t.Errorf("%c is %.1f tall, far over %.1f", sign, p.ascent, height)
			}
			type stretch struct{ low, high float64 }
			var list []stretch
			for _, it := range s.items[from:] {
				low, high := extent([]Item{it}, it.X)
				list = append(list, stretch{low, high})
			}
			slices.SortFunc(list, func(a, b stretch) int {
				if a.low < b.low {
					return -1
				}
				return 1
			})
			for i := 1; i < len(list); i++ {
				if list[i].low > list[i-1].high {
					t.Errorf("%c at %.0f: a gap of %.2f", sign, height, list[i].low-list[i-1].high)
				}
			}
		}
	}
}

func TestRootCoversItsBody(t *testing.T) {
	for _, body := range []Node{num("3"), sym("f", "y"), Fraction{sym("a"), sym("b")}, Fraction{Fraction{sym("a"), sym("b")}, Fraction{sym("a"), sym("b")}}} {
		in := one(t, body)
		b := one(t, Root{Body: body})
		bar := slices.MinFunc(rules(b), func(a, b Item) int { return int(math.Copysign(1, a.Y-b.Y)) })
		if bar.Y+bar.Height > -in.Ascent {
			t.Errorf("the bar lies at %.2f in a body %.2f tall", bar.Y, in.Ascent)
		}
		if bar.Width < in.Width {
			t.Errorf("the bar is %.2f long over a body %.2f wide", bar.Width, in.Width)
		}
		top, bottom := extent(b.Items, 0)
		near(t, "top of the sign and its bar", top, bar.Y)
		if bottom < in.Descent {
			t.Errorf("the sign ends %.2f below the baseline, the body %.2f", bottom, in.Descent)
		}
	}
}

func TestBraceSpansItsBranches(t *testing.T) {
	c := writerCases[slices.IndexFunc(writerCases, func(c writerCase) bool { return c.name == "choice" })]
	b := Break(c.chain, pt, column)[0]
	top, bottom := math.Inf(1), math.Inf(-1)
	for _, it := range b.Items {
		if it.Kind == Outline {
			top, bottom = extent(b.Items, it.X)
		}
	}
	for _, text := range []string{"0.85", "0.75", "0.65"} {
		it := find(t, b, text)
		if it.Y-0.7*pt < top-0.3*pt || it.Y > bottom+0.3*pt {
			t.Errorf("%s at %.1f is outside of the brace from %.1f to %.1f", text, it.Y, top, bottom)
		}
	}
	near(t, "conditions in a column", find(t, b, "otherwise").X, find(t, b, "if").X)
	arrow, taken := find(t, b, "←"), find(t, b, "0.75")
	near(t, "the mark's line", arrow.Y, taken.Y)
}

func TestLinksAndMarks(t *testing.T) {
	s := Symbol{Head: "τ", Sub: []string{"d"}, Ref: Ref{Target: "tau_d", Governs: true}}
	for _, it := range one(t, s).Items {
		if it.Link != "tau_d" || it.Face.Weight != 600 {
			t.Errorf("%q leads to %q with weight %d", it.Text, it.Link, it.Face.Weight)
		}
	}
	n := Number{Value: "4.5e3", Unit: Unit{mm2}, Ref: Ref{Target: "A"}}
	for _, it := range one(t, n).Items {
		if it.Link != "A" {
			t.Errorf("%q leads to %q", it.Text, it.Link)
		}
	}
}

// A character that no face has is set as its code, and a byte that is no text
// as the sign for that: the PDF writer's library stops at both.
func TestTextIsPrintable(t *testing.T) {
	for text, want := range map[string]string{
		"漢": "[U+6F22]", "\U0001F600": "[U+1F600]", "\x07": "[U+0007]", "\xff": "\uFFFD", "Ж": "Ж", "√": "√", "": "",
	} {
		got := ""
		for _, it := range Layout(Text{Text: text}, pt, fonts.Sans).Items {
			got += it.Text
			for _, r := range it.Text {
				if !it.Face.Has(r) {
					t.Errorf("%q: %s has no %q", text, it.Face.Name, r)
				}
			}
		}
		if got != want {
			t.Errorf("%q is set as %q, want %q", text, got, want)
		}
	}
}

func BenchmarkBreak(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		Break(shear, pt, column)
	}
}

func BenchmarkBreakLong(b *testing.B) {
	list := long()
	b.ReportAllocs()
	for b.Loop() {
		for _, c := range list {
			Break(c, pt, column)
		}
	}
}
