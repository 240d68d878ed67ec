package maths

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"gusset/render/fonts"
)

// long are 30 long and deep formulas, for lines of 120 mm at 11 pt.
func long() []Chain {
	v := func(name string) Symbol {
		head, sub, ok := strings.Cut(name, "_")
		if !ok {
			return sym(head)
		}
		return sym(head, strings.Split(sub, "_")...)
	}
	sum := func(terms ...Node) Row {
		var r Row
		for i, t := range terms {
			if i > 0 {
				r = append(r, Plus)
			}
			r = append(r, t)
		}
		return r
	}
	product := func(factors ...Node) Row {
		var r Row
		for i, t := range factors {
			if i > 0 {
				r = append(r, Beside)
			}
			r = append(r, t)
		}
		return r
	}
	times := func(factors ...Node) Row {
		var r Row
		for i, t := range factors {
			if i > 0 {
				r = append(r, Dot)
			}
			r = append(r, t)
		}
		return r
	}
	sq := func(n Node) Node { return Script{Base: n, Sup: two} }
	max := func(args ...Node) Node { return Call(Word{Text: "max"}, args...) }
	min := func(args ...Node) Node { return Call(Word{Text: "min"}, args...) }
	kNm := num("12.75", term("", "kN", 1), term("·", "m", 1))
	f := func(n, d Node) Node { return Fraction{n, d} }
	terms := func(n int, pattern string) (list []Node) {
		for i := range n {
			list = append(list, v(fmt.Sprintf(pattern, i+1)))
		}
		return list
	}
	var nested Node = v("x_0")
	for i := range 12 {
		nested = Paren(sum(nested, product(num("1.5"), v(fmt.Sprintf("x_%d", i+1)))))
	}
	var continued Node = num("1")
	for range 8 {
		continued = sum(num("1"), f(num("1"), continued))
	}
	johansen := product(v("f_h_1_k"), v("t_1"), v("d"))
	return []Chain{
		{v("τ"), []Step{eq(f(v("P"), product(two, v("A")))), eq(f(num("48", kN), times(two, num("490.9", mm2))))}},
		{v("A"), []Step{eq(f(product(v("π"), sq(v("d"))), num("4"))), eq(f(product(v("π"), sq(Paren(num("25", mm)))), num("4")))}},
		{v("σ_v"), []Step{eq(Root{Body: sum(sq(v("σ_x")), sq(v("σ_y")), product(num("3"), sq(v("τ_xy"))))}),
			eq(Root{Body: sum(sq(Paren(num("120.4", mPa))), sq(Paren(num("-35.25", mPa))), times(num("3"), sq(Paren(num("48.89", mPa)))))})}},
		{v("S"), []Step{eq(sum(terms(20, "F_%d")...)), eq(sum(terms(6, "G_%d")...))}},
		{v("S"), []Step{eq(sum(num("1", kN), num("2.5", kN), num("3.75", kN), num("12", kN), num("7.5", kN), num("9", kN), num("11.25", kN), num("8", kN), num("1.5", kN), num("2.5", kN)))}},
		{v("F_v_Rk"), []Step{eq(min(
			f(times(num("24.3", mPa), num("38", mm), num("3.75", mm)), sum(num("1"), num("0.5"))),
			f(times(num("24.3", mPa), num("50", mm), num("3.75", mm)), sum(num("1"), num("0.5"))),
			f(times(num("1.05"), num("24.3", mPa), num("38", mm), num("3.75", mm)), sum(two, num("1"))),
			f(times(num("1.15"), num("6112", term("", "N", 1), term("·", "mm", 1))), num("3.2")))),
			eq(num("812.5", term("", "N", 1)))}},
		{v("F_c"), []Step{eq(Row{f(johansen, sum(num("1"), v("β"))), Paren(Row{Root{Body: sum(v("β"), product(two, sq(v("β")), Fence{"[", sum(num("1"), f(v("t_2"), v("t_1")), sq(Paren(f(v("t_2"), v("t_1"))))), "]"}), product(Script{v("β"), nil, num("3")}, sq(Paren(f(v("t_2"), v("t_1"))))))}, Minus, v("β"), Paren(sum(num("1"), f(v("t_2"), v("t_1"))))}), Plus, f(v("F_ax_Rk"), num("4"))})}},
		{v("F_d"), []Step{eq(Row{num("1.05"), Beside, f(johansen, sum(two, v("β"))), Fence{"[", Row{Root{Body: sum(product(two, v("β"), Paren(sum(num("1"), v("β")))), f(product(num("4"), v("β"), Paren(sum(two, v("β"))), v("M_y_Rk")), product(v("f_h_1_k"), v("d"), sq(v("t_1")))))}, Minus, v("β")}, "]"}, Plus, f(v("F_ax_Rk"), num("4"))})}},
		{Row{sq(Paren(f(v("N_Ed"), v("N_Rd")))), Plus, sq(Paren(f(v("V_Ed"), v("V_Rd")))), Plus, sq(Paren(f(v("M_Ed"), v("M_Rd"))))},
			[]Step{eq(sum(sq(Paren(f(num("120.5", kN), num("355", kN)))), sq(Paren(f(num("48.25", kN), num("136.6", kN)))), sq(Paren(f(kNm, num("25.5", term("", "kN", 1), term("·", "m", 1))))))), {"<=", num("1")}}},
		{v("k"), []Step{eq(Choice{[]Branch{{num("0.85"), Row{v("t"), Relation("<="), num("25", mm)}, false}, {num("0.75"), Row{v("t"), Relation("<="), num("40", mm)}, true}, {num("0.65"), nil, false}}}), eq(num("0.75"))}},
		{v("M"), []Step{eq(Choice{[]Branch{
			{f(product(v("q"), sq(v("L"))), num("8")), Row{v("x_left"), Relation("<"), f(v("L"), two), And, v("q"), Relation(">"), num("0", perM...)}, true},
			{sum(terms(16, "m_%d")...), Row{v("x_left"), Relation("<"), product(two, v("L")), And, v("grade"), Relation("=="), Text{Text: `"S355"`}, Or, v("q"), Relation(">"), num("5", perM...)}, false},
			{num("0", perM...), nil, false}}})}},
		{v("y"), []Step{eq(nested)}},
		{v("φ"), []Step{eq(continued)}},
		{v("p"), []Step{eq(f(sum(terms(20, "a_%d")...), v("b")))}},
		{v("p"), []Step{eq(sum(v("c"), f(sum(terms(40, "a_%d")...), v("b"))))}},
		{v("r"), []Step{eq(Root{Body: sum(terms(24, "a_%d")...)}), eq(Root{Body: sum(terms(60, "a_%d")...), Index: num("3")})}},
		{v("p"), []Step{eq(product(terms(30, "k_%d")...))}},
		{v("p"), []Step{eq(times(terms(30, "k_%d")...))}},
		{sym("aVeryLongNameOfAQuantity", "with", "many", "parts", "below", "it"), []Step{eq(sum(terms(12, "F_%d")...)), eq(num("12.5", kN))}},
		{sym(strings.Repeat("long", 60)), []Step{eq(sym(strings.Repeat("name", 80)))}},
		{v("u"), []Step{eq(Fraction{num("1"), sym(strings.Repeat("name", 80))})}},
		{v("x"), []Step{eq(max(sum(terms(6, "a_%d")...), sum(terms(6, "b_%d")...), max(sum(terms(6, "c_%d")...), sum(terms(6, "d_%d")...))))}},
		{v("δ"), []Step{eq(sum(f(product(num("5"), v("q"), Script{v("L"), nil, num("4")}), product(num("384"), v("E"), v("I"))), f(product(v("q"), sq(v("L"))), product(num("8"), v("G"), v("A_s"))))),
			eq(sum(f(times(num("5"), num("12.5", term("", "kN", 1), term("/", "m", 1)), Script{Paren(num("6", term("", "m", 1))), nil, num("4")}), times(num("384"), num("210", term("", "GPa", 1)), num("8.356e7", term("", "mm", 4)))), f(times(num("12.5", term("", "kN", 1), term("/", "m", 1)), sq(Paren(num("6", term("", "m", 1))))), times(num("8"), num("80.77", term("", "GPa", 1)), num("2567", mm2))))), eq(num("12.19", mm))}},
		{v("R_u"), []Step{eq(Row{v("R_ult"), Beside, Script{Paren(Row{num("1"), Minus, Script{Base: v("e"), Sup: Row{Minus, num("10"), Beside, v("Δ")}}}), nil, num("0.55")}})}},
		{v("θ_p"), []Step{eq(Row{f(num("1"), two), Beside, Call(Word{Text: "atan2"}, product(two, v("τ_xy")), Row{v("σ_x"), Minus, v("σ_y")})}), eq(Row{f(num("1"), two), Dot, Call(Word{Text: "atan2"}, times(two, num("48.89", mPa)), Row{num("120.4", mPa), Minus, Paren(num("-35.25", mPa))})}), eq(num("16.07", term("", "°", 1)))}},
		{nil, []Step{{">=", sum(terms(30, "F_%d")...)}}},
		{v("K_w"), []Step{eq(sum(f(Row{times(num("4"), v("C")), Minus, num("1")}, Row{times(num("4"), v("C")), Minus, num("4")}), f(num("0.615"), v("C"))))}},
		{v("k_1"), []Step{eq(Row{f(num("1"), num("3")), Fence{"{", Row{num("1"), Minus, f(product(num("192"), v("b")), product(Script{v("π"), nil, num("5")}, v("a"))), Abs(sum(Call(Word{Text: "tanh"}, f(product(v("π"), v("a")), product(two, v("b")))), Row{f(num("1"), num("243")), Beside, Call(Word{Text: "tanh"}, f(product(num("3"), v("π"), v("a")), product(two, v("b"))))}))}, "}"}})}},
		{v("a"), []Step{{"<", v("b")}, {"<=", num("1.2e-5")}, {"<", sum(terms(8, "F_%d")...)}, {"<", sum(terms(8, "G_%d")...)}, {"<", num("-3.5e12", kN)}, {"<", v("z")}}},
		{v("v_Rd_c"), []Step{eq(max(Row{f(num("0.18"), v("γ_c")), Beside, v("k"), Beside, Script{Paren(product(num("100"), v("ρ_l"), v("f_ck"))), nil, Fraction{num("1"), num("3")}}}, Row{num("0.035"), Beside, Script{v("k"), nil, Fraction{num("3"), two}}, Beside, Root{Body: v("f_ck")}})),
			eq(max(times(f(num("0.18"), num("1.5")), num("1.943"), Script{Paren(times(num("100"), num("0.012"), num("30"))), nil, Fraction{num("1"), num("3")}}), times(num("0.035"), Script{num("1.943"), nil, Fraction{num("3"), two}}, Root{Body: num("30")}))), eq(num("0.770", mPa))}},
	}
}

const column = 120 * 72 / 25.4

func TestLongFormulasKeepToTheColumn(t *testing.T) {
	if n := len(long()); n < 30 {
		t.Fatalf("%d formulas, want 30", n)
	}
	for i, c := range long() {
		for _, width := range []float64{column, column / 2, column / 4} {
			for j, b := range Break(c, pt, width) {
				if b.Width > width+1e-6 {
					t.Errorf("formula %d in %.0f: line %d is %.1f wide", i+1, width, j+1, b.Width)
				}
				for _, it := range b.Items {
					if it.X < -1e-6 || it.X+it.Width > width+1e-6 {
						t.Errorf("formula %d in %.0f: line %d has %q from %.1f to %.1f", i+1, width, j+1, it.Text, it.X, it.X+it.Width)
					}
				}
			}
		}
	}
}

// A text of many words goes on to the next line at a blank.
func TestLongTextsBreakAtBlanks(t *testing.T) {
	words := strings.Repeat("plates from the northern stock ", 6) + "end"
	var lines []string
	for _, b := range Break(Chain{Left: sym("grade"), Steps: []Step{eq(Text{Text: words})}}, pt, column) {
		line := ""
		for _, it := range b.Items {
			line += it.Text
		}
		lines = append(lines, strings.TrimPrefix(line, "grade="))
	}
	if got := strings.Join(lines, " "); len(lines) < 2 || got != words {
		t.Errorf("got %q", lines)
	}
}

// Each rule of a fraction has something above it and something below it on its
// own line; that of a root has its sign at its left end.
func TestLongFormulasSplitNoFraction(t *testing.T) {
	for i, c := range long() {
		for j, b := range Break(c, pt, column) {
			for _, r := range rules(b) {
				above, below, sign := false, false, false
				for _, it := range b.Items {
					if it.Kind == Outline && math.Abs(it.Y-r.Y) < 40 && it.X < r.X && r.X-it.X < 2*pt {
						sign = true
					}
					if it.Kind != Run || it.X < r.X-1e-6 || it.X+it.Width > r.X+r.Width+1e-6 {
						continue
					}
					above = above || it.Y < r.Y
					below = below || it.Y > r.Y
				}
				if !below || !above && !sign {
					t.Errorf("formula %d line %d: a rule of %.1f has above %v, below %v, sign %v", i+1, j+1, r.Width, above, below, sign)
				}
			}
		}
	}
}

// A continuation starts under the first right side, or further in by a step
// for each level within that it breaks at, or with its relation under the first
// relation.
func TestLongFormulasContinueUnderTheirRightSide(t *testing.T) {
	checked := 0
	for i, c := range long() {
		lines := Break(c, pt, column)
		left := 0.0
		if c.Left != nil {
			left = one(t, c.Left).Width + 5*pt/18
		}
		if len(lines) == 1 || left > longLeft*column {
			continue
		}
		sign := Relation(c.Steps[0].Sign).Sign
		under := left + float64(fonts.Math.Width(sign))*pt/1000 + 5*pt/18
		for j, b := range lines[1:] {
			first := b.Items[0]
			x := first.X
			for _, it := range b.Items {
				x = min(x, it.X)
			}
			want := under
			if deep := math.Floor((x - under) / (step * pt)); deep > 0 {
				want += deep * step * pt
			}
			if strings.ContainsAny(first.Text, "=<≤≥") {
				want = left
			}
			// A letter's first stroke stands a little to the right of its place.
			if x < want-1e-6 || x > want+0.3*pt {
				t.Errorf("formula %d: line %d starts at %.2f, want %.2f", i+1, j+2, x, want)
			}
			checked++
		}
	}
	if checked < 30 {
		t.Errorf("only %d continuation lines", checked)
	}
}

// What breaks within a bracket is set in further than what stands beside it.
func TestLongFormulasShowTheirLevels(t *testing.T) {
	product := func(a, b Node) Node { return Row{a, Dot, b} }
	squared := func(n Node) Node { return Script{n, nil, num("2")} }
	inside := func(name string) Node {
		return Paren(Row{product(num("180.0", mm), squared(Paren(Row{num("200.0", mm), Minus, num("24.51", mm)}))), Plus, product(squared(sym(name)), num("180.0", mm))})
	}
	lines := Break(Chain{Left: sym("I"), Steps: []Step{eq(Row{inside("first"), Plus, inside("secondLongName"), Plus, inside("thirdLongName")})}}, pt, column/1.4)
	var starts []string
	var at []float64
	for _, b := range lines {
		starts, at = append(starts, b.Items[0].Text), append(at, b.Items[0].X)
	}
	if len(lines) != 6 {
		t.Fatalf("lines start with %q, want 6 of them", starts)
	}
	for i := 2; i < 6; i += 2 {
		if math.Abs(at[i]-at[2]) > 0.01 || at[i-1] < at[2]+0.9*step*pt || at[i+1] < at[2]+0.9*step*pt {
			t.Errorf("lines start with %q at %.2f: the terms want to stand under each other, what is in them further in", starts, at)
		}
	}
}

// Behind a numerator that went over several lines the denominator starts a
// line, further out than what breaks within either.
func TestLongQuotientsPartAtTheirSlash(t *testing.T) {
	sum := func(name string) Node {
		var r Row
		for i := range 8 {
			if i > 0 {
				r = append(r, Plus)
			}
			r = append(r, num("180.25", mm), Dot, sym(name))
		}
		return r
	}
	for _, n := range []Node{Root{Body: Fraction{sum("x"), sum("y")}}, Fraction{sum("x"), sum("y")}} {
		slash, within := -1.0, 1e9
		for i, b := range Break(Chain{Left: sym("I"), Steps: []Step{eq(n)}}, pt, column) {
			switch b.Items[0].Text {
			case "/":
				slash = b.Items[0].X
			case "+":
				within = min(within, b.Items[0].X)
			}
			if b.Ascent+b.Descent > 2*pt {
				t.Errorf("line %d is %.1f high, as for the fraction that is written out", i+1, b.Ascent+b.Descent)
			}
		}
		if slash < 0 || slash >= within {
			t.Errorf("the slash at %.2f, sums within at %.2f and on", slash, within)
		}
	}
}

// A comparison goes to the next line with all the ways of writing its right
// side where they share it, else no sooner than it has to.
func TestComparisonsKeepTheirRightSides(t *testing.T) {
	starts := func(capacity Node) (list []string) {
		chain := Chain{Left: sym("tau"), Steps: []Step{eq(num("48.8925", mm)), {"<=", capacity}, eq(Row{num("0.95"), Dot, num("355.1", mm)}), eq(num("319.55", mm))}}
		room := one(t, Row{sym("tau"), Relation("="), num("48.8925", mm), Relation("<="), sym("capacityOfThePlateInShear")}).Width
		for _, b := range Break(chain, pt, room+1) {
			list = append(list, b.Items[0].Text)
		}
		return list
	}
	if got := starts(sym("f")); !slices.Equal(got, []string{"tau", "≤"}) {
		t.Errorf("lines start with %q", got)
	}
	if got := starts(sym("capacityOfThePlateInShear")); slices.Contains(got, "≤") {
		t.Errorf("lines start with %q: the comparison has room on the first", got)
	}
}

// An argument's name stays on a line with the start of its value, however long
// that is.
func TestLongArgumentsKeepTheirNames(t *testing.T) {
	var list Row
	for i := range 8 {
		if i > 0 {
			list = append(list, Comma)
		}
		list = append(list, num("-2.75", mm))
	}
	long := Paren(list)
	eq := Relation("=")
	for _, args := range []Row{
		{Pair(sym("x"), long), Comma, Pair(sym("y"), long), Comma, Pair(sym("z"), num("1"))},
		{sym("x"), eq, long, Comma, sym("y"), eq, long, Comma, Pair(sym("z"), num("1"))},
	} {
		for width := 60.0; width < column; width += 7 {
			for i, b := range Break(Chain{Left: args}, pt, width) {
				if b.Items[0].Text == "=" {
					t.Errorf("%.0f wide: line %d starts with a relation", width, i+1)
				}
			}
		}
	}
}

// Text stays text: each name, figure and operator of a formula is among the
// runs of its lines.
func TestLongFormulasKeepTheirText(t *testing.T) {
	for i, c := range long() {
		count := func(width float64) map[string]int {
			all := map[string]int{}
			for _, b := range Break(c, pt, width) {
				for _, it := range b.Items {
					for _, r := range it.Text {
						all[string(r)]++
					}
				}
			}
			return all
		}
		wide, narrow := count(1e6), count(column)
		for r, n := range wide {
			if narrow[r] < n {
				t.Errorf("formula %d: %q stands %d times in the column, %d on one line", i+1, r, narrow[r], n)
			}
		}
	}
}
