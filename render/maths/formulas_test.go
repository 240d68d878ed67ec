package maths

import "gusset/units"

// The formulas that the tests of every writer share.

func sym(head string, sub ...string) Symbol { return Symbol{Head: head, Sub: sub} }

func term(sep, name string, num int) units.Term {
	return units.Term{Sep: sep, Name: name, Num: num, Den: 1}
}

func num(value string, unit ...units.Term) Number { return Number{Value: value, Unit: unit} }

var (
	mm   = term("", "mm", 1)
	mm2  = term("", "mm", 2)
	kN   = term("", "kN", 1)
	mPa  = term("", "MPa", 1)
	two  = num("2")
	perM = []units.Term{term("", "kN", 1), term("/", "m", 2)}
)

func linked(n Number, target, tip string) Number {
	n.Ref = Ref{Target: target, Tip: tip}
	return n
}

func power(base Node, sup Node) Script { return Script{Base: base, Sup: sup} }

func eq(right Node) Step { return Step{"=", right} }

// shear is the formula of the package comment.
var shear = Chain{sym("τ"), []Step{
	eq(Fraction{sym("P"), Row{two, Beside, sym("A")}}),
	eq(Fraction{linked(num("48", kN), "P", "P = 48 kN"), Row{two, Dot, linked(num("490.9", mm2), "A", "A = π·d²/4")}}),
}}

type writerCase struct {
	name  string
	chain Chain
	plain string
}

var writerCases = []writerCase{
	{"shear", shear, "τ = P/(2·A) = 48 kN/(2·490.9 mm²)"},
	{"subscripts", Chain{Symbol{Head: "F", Sub: []string{"v", "Rd"}}, []Step{eq(Fraction{
		Row{sym("α", "v"), Beside, sym("f", "ub"), Beside, sym("A")}, sym("γ", "M2")})}},
		"F_v_Rd = α_v·f_ub·A/γ_M2"},
	{"power", Chain{sym("A"), []Step{
		eq(Fraction{Row{sym("π"), Beside, power(sym("d"), two)}, num("4")}),
		eq(Fraction{Row{sym("π"), Beside, power(Paren(num("25", mm)), two)}, num("4")})}},
		"A = π·d²/4 = π·(25 mm)²/4"},
	{"exponent", Chain{sym("γ"), []Step{eq(num("-6.036e-4"))}}, "γ = −6.036×10⁻⁴"},
	{"fractional-power", Chain{sym("M", "y"), []Step{
		eq(Row{num("0.3"), Beside, sym("f", "u"), Beside, power(sym("d"), num("2.6"))}),
		eq(power(sym("x"), Fraction{num("1"), num("3")}))}},
		"M_y = 0.3·f_u·d^2.6 = x^(1/3)"},
	{"negative-power", Chain{nil, []Step{eq(power(sym("x"), num("-2")))}}, "= x⁻²"},
	{"roots", Chain{sym("τ", "y"), []Step{
		eq(Fraction{sym("f", "y"), Row{Root{Body: num("3")}, Beside, sym("γ", "M")}}),
		eq(Root{Body: Row{power(sym("σ"), two), Plus, num("3"), Beside, power(sym("τ"), two)}}),
		eq(Root{sym("V"), num("3")})}},
		"τ_y = f_y/(√3·γ_M) = √(σ² + 3·τ²) = ³√V"},
	{"call", Chain{sym("x"), []Step{
		eq(Row{Call(Word{Text: "max"}, sym("a"), Row{sym("b"), Plus, num("1")}), Plus, Call(Word{Text: "sin"}, num("30", term("", "°", 1)))})}},
		"x = max(a, b + 1) + sin(30°)"},
	{"bars", Chain{sym("σ"), []Step{eq(Abs(Row{sym("a"), Minus, sym("b")}))}}, "σ = |a − b|"},
	{"sign", Chain{sym("x"), []Step{eq(Row{Minus, sym("a"), Minus, Paren(Row{Minus, sym("b")})})}}, "x = −a − (−b)"},
	{"units-multiplied", Chain{sym("A"), []Step{eq(Row{num("25", mm), Dot, num("5", mm)})}}, "A = 25 mm · 5 mm"},
	{"choice", Chain{sym("k"), []Step{eq(Choice{[]Branch{
		{num("0.85"), Row{sym("t"), Relation("<="), num("25", mm)}, false},
		{num("0.75"), Row{sym("t"), Relation("<="), num("40", mm)}, true},
		{num("0.65"), nil, false}}})}},
		"k = {0.85 if t ≤ 25 mm; 0.75 if t ≤ 40 mm ←; 0.65 otherwise}"},
	{"check", Chain{Row{power(Paren(Fraction{sym("N"), sym("N", "d")}), two), Plus, power(Paren(Fraction{sym("V"), sym("V", "d")}), two)},
		[]Step{{"<=", num("1")}}}, "(N/N_d)² + (V/V_d)² ≤ 1"},
	{"prime-and-figures", Chain{Symbol{Head: "x1", Primes: 1}, []Step{eq(power(Symbol{Head: "f", Primes: 2}, two))}}, "x1′ = f″²"},
	{"text", Chain{sym("grade"), []Step{eq(Text{Text: `"S355"`})}}, `grade = "S355"`},
	{"unit-forms", Chain{sym("q"), []Step{eq(num("5", perM...)), eq(num("2", units.Term{Name: "MPa", Num: 1, Den: 1}, units.Term{Sep: "·", Name: "m", Num: 1, Den: 2})),
		eq(num("1", units.Term{Name: "kg", Num: 1, Den: 1}, units.Term{Sep: "/", Open: true, Name: "m", Num: 1, Den: 1}, units.Term{Sep: "·", Name: "s", Num: -2, Den: 1, Close: true}))}},
		"q = 5 kN/m² = 2 MPa·m^(1/2) = 1 kg/(m·s⁻²)"},
	{"logic", Chain{Row{sym("a"), Relation("<"), sym("b"), And, Not, sym("c"), Relation("=="), sym("d"), Or, sym("e")}, nil}, "a < b and not c = d or e"},
	{"nested-fraction", Chain{sym("x"), []Step{eq(Row{sym("a"), Beside, Fraction{Row{sym("b"), Plus, Fraction{num("1"), sym("c")}}, Fraction{sym("d"), sym("e")}}, Beside, sym("f")})}},
		"x = a·(b + 1/c)/(d/e)·f"},
	{"governing", Chain{sym("F"), []Step{eq(Call(Word{Text: "min"}, Number{Value: "3", Ref: Ref{Governs: true}}, num("4")))}}, "F = min(3, 4)"},
	{"escapes", Chain{Symbol{Head: "a", Sub: []string{"<&>"}}, []Step{{"<", Text{Text: "\"\x00\xff", Ref: Ref{Tip: `x < "y"`}}}}}, "a_<&> < \"\x00\xff"},
}
