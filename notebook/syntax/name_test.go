package syntax

import (
	"math/big"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"gusset/notebook/diag"
)

func TestCanonical(t *testing.T) {
	for name, want := range map[string]string{
		"τ_d": "tau_d", "tau_d": "tau_d", "A": "A", "σ_x,": "sigma_x,", "γ_Μ": "gamma_Mu",
		"φ": "phi", "ϕ": "phi", "ε": "epsilon", "ϵ": "epsilon", "θ": "theta", "ϑ": "theta",
		"\u00b5_1": "mu_1", "\u03bc_1": "mu_1", "\u2126": "Omega", "\u03a9": "Omega", "Δ": "Delta", "∆": "Delta",
		"Δσ": "Deltasigma", "f_α'": "f_alpha'", "bolts.σ": "bolts.sigma", "é": "é",
	} {
		if got := Canonical(name); got != want {
			t.Errorf("Canonical(%q) = %q, want %q", name, got, want)
		}
	}
}

func TestDisplayParts(t *testing.T) {
	part := func(text string) NamePart { return NamePart{Text: text} }
	greek := func(text string) NamePart { return NamePart{Text: text, Greek: true} }
	for name, want := range map[string][]NamePart{
		"A":             {part("A")},
		"F_v_Rd":        {part("F"), part("v"), part("Rd")},
		"tau_max":       {greek("τ"), part("max")},
		"τ_max":         {greek("τ"), part("max")},
		"sigma1":        {greek("σ1")},
		"k_tau2":        {part("k"), greek("τ2")},
		"f_c'":          {part("f"), {Text: "c", Primes: 1}},
		"f''_c":         {{Text: "f", Primes: 2}, part("c")},
		"gamma'":        {{Text: "γ", Greek: true, Primes: 1}},
		"tauber":        {part("tauber")},
		"Delta_T":       {greek("Δ"), part("T")},
		"\u2126_\u2206": {greek("Ω"), greek("Δ")},
		"Δσ":            {greek("Δσ")},
		"a__b_":         {part("a"), part("b")},
		"pi":            {greek("π")},
	} {
		if diff := cmp.Diff(want, DisplayParts(name)); diff != "" {
			t.Errorf("%s: %s", name, diff)
		}
	}
}

// Every letter is its English name's, and back.
func TestGreekIsOneName(t *testing.T) {
	for _, g := range greekLetters {
		for _, spelling := range append(strings.Split(g.variants, ""), string(g.letter), g.english) {
			if got := Canonical("x_" + spelling + "1"); got != "x_"+g.english+"1" {
				t.Errorf("%s: %s", spelling, got)
			}
			if got := DisplayParts(spelling); got[0].Text != string(g.letter) && spelling == g.english {
				t.Errorf("%s is shown as %v", spelling, got)
			}
			src := diag.NewSource("x.md", []byte(spelling+"_1"))
			e, diags := ParseExpr(src, diag.Span{Start: 0, End: len(src.Text)})
			if n, ok := e.(*Name); !ok || n.ID != g.english+"_1" || n.Text != spelling+"_1" || len(diags) > 0 {
				t.Errorf("%s reads as %s", spelling, DumpExpr(e))
			}
		}
	}
}

// The words of section 3 may not be names, all others may.
func TestReserved(t *testing.T) {
	for word := range strings.FieldsSeq("if otherwise else and or not at over first of with where check needs warn gives") {
		if !IsReserved(word) {
			t.Errorf("%s is not reserved", word)
		}
		if _, _, diags := parseCalc(word + " = 3"); len(diags) != 1 || diags[0].ID != diag.Syntax {
			t.Errorf("%s = 3: %v", word, diags)
		}
		for _, name := range []string{word + "_1", "f_" + word, strings.ToUpper(word)} {
			if _, _, diags := parseCalc(name + " = 3 mm + " + name); len(diags) > 0 {
				t.Errorf("%s: %s", name, diags[0].Text())
			}
		}
	}
	for word := range strings.FieldsSeq("to from against limit steps title full brief calc helper in min max e i pi m kN") {
		if _, _, diags := parseCalc(word + " = 3 mm + " + word); len(diags) > 0 {
			t.Errorf("%s: %s", word, diags[0].Text())
		}
	}
}

func TestFigures(t *testing.T) {
	for _, test := range []struct {
		figures, exact string
		mant           int64
		exp10          int
		decimal        bool
	}{
		{"12", "12", 12, 0, true},
		{"12.50", "25/2", 1250, -2, true},
		{".5", "1/2", 5, -1, true},
		{"12_500", "12500", 12500, 0, true},
		{"1.2e-3", "3/2500", 12, -4, true},
		{"2.1E5", "210000", 21, 4, true},
		{"1e+2", "100", 1, 2, true},
		{"0.000", "0", 0, -3, true},
		{"1 1/4", "5/4", 0, 0, false},
		{"1  3/8", "11/8", 0, 0, false},
		{"3/4", "3/4", 0, 0, false},
		{"999999999999999", "999999999999999", 999999999999999, 0, true},
		{"9999999999999999", "9999999999999999", 0, 0, false},
		{"1e300", "1" + strings.Repeat("0", 300), 1, 300, true},
	} {
		p := Piece{Figures: test.figures}
		r, err := p.Rat()
		if err != nil || r.RatString() != test.exact {
			t.Errorf("%s: %v, %v", test.figures, r, err)
		}
		mant, exp10, ok := p.Decimal()
		if ok != test.decimal || ok && (mant != test.mant || exp10 != test.exp10) {
			t.Errorf("%s: %d·10^%d, %v", test.figures, mant, exp10, ok)
		}
	}
	for _, figures := range []string{"", "x", "1/0", "1e9999", "1e", "1.2.3", strings.Repeat("1", maxFigures+1)} {
		if r, err := (Piece{Figures: figures}).Rat(); err == nil {
			t.Errorf("%q is %v", figures, r)
		}
		if _, _, ok := (Piece{Figures: figures}).Decimal(); ok {
			t.Errorf("%q is a decimal", figures)
		}
	}
}

// The two ways to a number's value agree.
func TestDecimalAgreesWithRat(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := Piece{Figures: rapid.StringMatching(`[0-9]{1,9}(\.[0-9]{1,6})?([eE][+-]?[0-9]{1,2})?`).Draw(t, "figures")}
		mant, exp10, ok := p.Decimal()
		exact, err := p.Rat()
		if !ok || err != nil {
			t.Fatalf("%s: %v, %v", p.Figures, ok, err)
		}
		power := new(big.Rat).SetInt(new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(max(exp10, -exp10))), nil))
		if exp10 < 0 {
			power.Inv(power)
		}
		if power.Mul(power, new(big.Rat).SetInt64(mant)).Cmp(exact) != 0 {
			t.Fatalf("%s: %d·10^%d is not %s", p.Figures, mant, exp10, exact)
		}
	})
}

func TestValueRef(t *testing.T) {
	for _, test := range []struct {
		source, id, unit string
		ok               bool
		diagnostic       string
	}{
		{"{tau}", "tau", "", true, ""},
		{"{ τ_d [ksi] }", "tau_d", "ksi", true, ""},
		{"{tau[N/mm^2]}", "tau", "N/mm^2", true, ""},
		{"{bolts.x [mm]}", "bolts.x", "mm", true, ""},
		{"{tau [kips]}", "tau", "", true, "wrong-unit-spelling"},
		{"{tau [stress]}", "tau", "", true, "syntax"},
		{"{tau []}", "tau", "", true, "syntax"},
		{"{tau [xyz]}", "tau", "", true, "unknown-unit"},
		{"{}", "", "", false, ""},
		{"{ }", "", "", false, ""},
		{"{2}", "", "", false, ""},
		{"{if}", "", "", false, ""},
		{"{tau + 1}", "", "", false, ""},
		{"{tau [MPa] x}", "", "", false, ""},
		{"{tau (MPa)}", "", "", false, ""},
		{"{a b}", "", "", false, ""},
		{"{a.}", "", "", false, ""},
		{"{\"a\": 1}", "", "", false, ""},
	} {
		src := diag.NewSource("x.md", []byte("at "+test.source+"."))
		ref, ok, d := ParseValueRef(src, diag.Span{Start: 3, End: 3 + len(test.source)})
		if ok != test.ok || (d != nil) != (test.diagnostic != "") || d != nil && d.ID != test.diagnostic {
			t.Errorf("%s: %v, %v", test.source, ok, d)
			continue
		}
		if !ok {
			continue
		}
		if ref.Name.ID != test.id || src.Slice(ref.At) != test.source || ref.Name.Slot != -1 {
			t.Errorf("%s: %v", test.source, ref.Name)
		}
		if unit := ref.Unit; test.unit != "" && (unit == nil || unit.Unit.String() != test.unit) {
			t.Errorf("%s: unit %v", test.source, unit)
		}
	}
}

func TestUnitRef(t *testing.T) {
	for _, test := range []struct {
		source, quantity string
		column, point    bool
	}{
		{"[ MPa ]", "", false, false},
		{"[kN*m/m]", "", false, false},
		{"[degC]", "", false, true},
		{"[1/K]", "", false, false},
		{"[%]", "", false, false},
		{"[force]", "force", false, false},
		{"[line load]", "line load", false, false},
		{"[line-load]", "line-load", false, false},
		{"[column of length]", "length", true, false},
		{"[column of  second moment of area]", "second moment of area", true, false},
		{"[column of mm]", "", true, false},
		{"[number]", "number", false, false},
		{"[temperature]", "temperature", false, true},
	} {
		_, parse := fenced("helper h", "x "+test.source+"\ngives x\n")
		b, diags := parse()
		if len(diags) > 0 {
			t.Errorf("%s: %s", test.source, diags[0].Text())
			continue
		}
		u := b.Helper.Params[0].Unit
		if u.Quantity != test.quantity || u.Column != test.column || u.Point != test.point || u.Text != strings.TrimSpace(strings.Trim(test.source, "[]")) {
			t.Errorf("%s: %+v", test.source, u)
		}
	}
}

func TestCells(t *testing.T) {
	for _, test := range []struct {
		source, tree, text, err string
		quoted                  bool
	}{
		{"-70", "(- 70)", "-70", "", false},
		{"75.5", "75.5", "75.5", "", false},
		{" 3/4 ", "3/4", "3/4", "", false},
		{"1 1/8", "1+1/8", "1 1/8", "", false},
		{"-1 1/8", "(- 1+1/8)", "-1 1/8", "", false},
		{"1 1/8 in", "1+1/8_in", "1 1/8 in", "", false},
		{"2*a", "(* 2 a)", "2*a", "", false},
		{"-40 degC", "-40_degC", "-40 degC", "", false},
		{"S355 J2", "", "S355 J2", "syntax", false},
		{"#5", "", "#5", "syntax", false},
		{"1,200", "", "1,200", "syntax", false},
		{"3 kips", "", "3 kips", "wrong-unit-spelling", false},
		{"a < b", "", "a < b", "syntax", false},
		{"-", "", "-", "syntax", false},
		{"", "", "", "", false},
		{"S355", `"S355"`, "S355", "", true},
		{`"S355"`, `"S355"`, "S355", "", true},
		{`a \| b`, "", "a | b", "syntax", false},
		{"3 J/kg*K", "3_J/kg*K", "3 J/kg*K", "ambiguous-unit", false},
	} {
		src := diag.NewSource("x.csv", []byte(test.source))
		c := ParseCell(src, diag.Span{Start: 0, End: len(test.source)}, test.quoted)
		got := ""
		if c.Expr != nil {
			got = DumpExpr(c.Expr)
		}
		id := ""
		if c.Err != nil {
			id = c.Err.ID
		}
		if got != test.tree || c.Text != test.text || id != test.err || c.Quoted != test.quoted {
			t.Errorf("%q: %s, text %q, %s", test.source, got, c.Text, id)
		}
	}
	src := diag.NewSource("x.csv", []byte("x_1 [mm],y [xx]"))
	if col, d := ParseHeaderCell(src, diag.Span{Start: 0, End: 8}); d != nil || col.Name.ID != "x_1" || col.Unit.Text != "mm" {
		t.Errorf("%v, %v", col, d)
	}
	if _, d := ParseHeaderCell(src, diag.Span{Start: 9, End: 15}); d == nil || d.ID != diag.UnknownUnit {
		t.Errorf("%v", d)
	}
}

func TestSlots(t *testing.T) {
	_, b, _ := parseCalc("k [kN] = a*f(b, c=d) if max(x over r) > e\n= a otherwise\nwhere a [mm]")
	def := b.Stmts[0].(*Definition)
	var got []string
	for _, branch := range def.Branches {
		for _, e := range []Expr{branch.Value, branch.Cond} {
			Walk(e, func(x Expr) bool {
				if n, ok := x.(*Name); ok {
					if n.Slot != len(got) {
						t.Errorf("%s has slot %d, want %d", n.ID, n.Slot, len(got))
					}
					got = append(got, n.ID)
				}
				return true
			})
		}
	}
	if want := strings.Fields("a f b d max x r e a"); !cmp.Equal(got, want) || def.Slots != len(want) {
		t.Errorf("%v, %d slots", got, def.Slots)
	}
	if def.Name.Slot != -1 || def.Where[0].Name.Slot != -1 {
		t.Error("a defined name has a slot")
	}
}

func TestPrint(t *testing.T) {
	for source, want := range map[string]string{
		"a  +\tb":         "a + b",
		`f( "x  y",  2 )`: `f( "x  y", 2 )`,
		"a*b ≤  c":        "a*b ≤ c",
	} {
		src := diag.NewSource("x.md", []byte(source))
		e, _ := ParseExpr(src, diag.Span{Start: 0, End: len(source)})
		if got := Print(src, e); got != want {
			t.Errorf("%q: %q", source, got)
		}
	}
	// over several lines notes are left out and operators get plain blanks
	for source, want := range map[string]string{
		"x = f(a +  # note\n  b, -(e\n), n=c*\n d)":       "f(a + b, -(e), n=c*d)",
		"x = first of a,\n b with\n not a < b and\nc > d": "first of a, b with not a < b and c > d",
		"x = max(F +\n G over r) + t.a at\n b":            "max(F + G over r) + t.a at b",
		"x = (a^\n2 -\n 3 mm)/\n5":                        "(a^2 - 3 mm)/5",
	} {
		src, b, diags := parseCalc(source)
		if len(diags) > 0 {
			t.Errorf("%q: %s", source, diags[0].Text())
			continue
		}
		if got := Print(src, b.Stmts[0].(*Definition).Branches[0].Value); got != want {
			t.Errorf("%q: %q", source, got)
		}
	}
}
