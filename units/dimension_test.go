package units

import (
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// dimOf reads a dimension from a unit.
func dimOf(unit string) Dimension {
	if unit == "" {
		return Dimension{}
	}
	return MustParse(unit).Dim()
}

func TestDimensionWords(t *testing.T) {
	for _, row := range []struct{ unit, base, name, words, article string }{
		{"", "", "number", "number", "a plain number"},
		{"rad", "", "number", "number", "a plain number"},
		{"mm", "m", "length", "length", "a length"},
		{"mm^2", "m^2", "area", "area", "an area"},
		{"mm^3", "m^3", "volume", "volume", "a volume"},
		{"mm^4", "m^4", "second moment of area", "second moment of area", "a second moment of area"},
		{"mm^6", "m^6", "warping constant", "warping constant", "a warping constant"},
		{"kN", "kg*m/s^2", "force", "force", "a force"},
		{"kN*m", "kg*m^2/s^2", "moment", "moment", "a moment"},
		{"J", "kg*m^2/s^2", "moment", "moment", "a moment"},
		{"kN/mm", "kg/s^2", "line load", "force per length", "a force per length"},
		{"MPa", "kg/(m*s^2)", "stress", "stress", "a stress"},
		{"kN/m^3", "kg/(m^2*s^2)", "weight density", "force per volume", "a force per volume"},
		{"kg/m^3", "kg/m^3", "density", "density", "a density"},
		{"m/s^2", "m/s^2", "acceleration", "acceleration", "an acceleration"},
		{"1/K", "1/K", "per temperature", "number per temperature", "a number per temperature"},
		{"A", "A", "electric current", "electric current", "an electric current"},
		{"MPa*m^(1/2)", "kg/(m^(1/2)*s^2)", "", "stress times length^(1/2)", "a stress times length^(1/2)"},
		{"MPa^(1/2)", "kg^(1/2)/(m^(1/2)*s)", "", "stress^(1/2)", "a stress^(1/2)"},
		{"1/mm", "1/m", "", "number per length", "a number per length"},
		{"mm/N", "s^2/kg", "", "length per force", "a length per force"},
		{"1/MPa", "m*s^2/kg", "", "number per stress", "a number per stress"},
		{"kN^2", "kg^2*m^2/s^4", "", "force^2", "a force^2"},
		{"W/(m*K)", "kg*m/(s^3*K)", "", "force per time and temperature", "a force per time and temperature"},
		{"N*m*s", "kg*m^2/s", "", "moment times time", "a moment times time"},
		{"kN*m^3", "kg*m^4/s^2", "", "force times volume", "a force times volume"},
		{"mm^5", "m^5", "", "length^5", "a length^5"},
		{"mm^(13/5)", "m^(13/5)", "", "length^(13/5)", "a length^(13/5)"},
		{"N*mm^(8/5)", "kg*m^(13/5)/s^2", "", "moment times length^(3/5)", "a moment times length^(3/5)"},
		{"m^2/s", "m^2/s", "", "area per time", "an area per time"},
		{"m^2/s^2", "m^2/s^2", "", "speed^2", "a speed^2"},
		{"mol/L", "mol/m^3", "", "amount of substance per volume", "an amount of substance per volume"},
	} {
		d := dimOf(row.unit)
		if got := d.Base(); got != row.base {
			t.Errorf("%s: base is %s, want %s", row.unit, got, row.base)
		}
		if got := d.Name(); got != row.name {
			t.Errorf("%s: name is %q, want %q", row.unit, got, row.name)
		}
		if got := d.Words(); got != row.words {
			t.Errorf("%s: words are %q, want %q", row.unit, got, row.words)
		}
		if got := d.Article(); got != row.article {
			t.Errorf("%s: with article %q, want %q", row.unit, got, row.article)
		}
	}
}

func TestDimensionBound(t *testing.T) {
	m := dimOf("m")
	hundred, err := m.Pow(100, 1)
	if err != nil {
		t.Fatal(err)
	}
	for name, f := range map[string]func() (Dimension, error){
		"product":         func() (Dimension, error) { return hundred.Mul(m) },
		"power":           func() (Dimension, error) { return m.Pow(101, 1) },
		"root":            func() (Dimension, error) { return m.Pow(1, 101) },
		"far root":        func() (Dimension, error) { return m.Pow(1, 1<<62) },
		"far power":       func() (Dimension, error) { return m.Pow(-1<<63, 1) },
		"least over less": func() (Dimension, error) { return m.Pow(3, -1<<63) },
	} {
		if _, err := f(); err == nil || !strings.Contains(err.Error(), "bound of 100") {
			t.Errorf("%s: error is %v, want one that names the bound of 100", name, err)
		}
	}
	if _, err := m.Pow(1, 0); err == nil {
		t.Error("a denominator of 0 is no error")
	}
	if d, err := (Dimension{}).Pow(1<<62, 3); err != nil || !d.IsNumber() {
		t.Errorf("a power of a number: %v, %v", d, err)
	}
	if d, err := m.Pow(1<<40, 1<<39); err != nil || d != dimOf("m^2") {
		t.Errorf("a power in large terms: %v, %v", d.Base(), err)
	}
}

// anyDimension draws dimensions small enough for every law below to stay within bounds.
var anyDimension = rapid.Custom(func(t *rapid.T) Dimension {
	var d Dimension
	for i := range d.exp {
		d.exp[i], _ = newExponent(rapid.Int64Range(-4, 4).Draw(t, "num"), rapid.Int64Range(1, 3).Draw(t, "den"))
	}
	return d
})

func TestDimensionLaws(t *testing.T) {
	must := func(d Dimension, err error) Dimension {
		if err != nil {
			t.Fatal(err)
		}
		return d
	}
	rapid.Check(t, func(t *rapid.T) {
		a, b, c := anyDimension.Draw(t, "a"), anyDimension.Draw(t, "b"), anyDimension.Draw(t, "c")
		n := rapid.Int64Range(1, 4).Draw(t, "n")
		for _, law := range []struct {
			name        string
			left, right Dimension
		}{
			{"a*b = b*a", must(a.Mul(b)), must(b.Mul(a))},
			{"(a*b)*c = a*(b*c)", must(must(a.Mul(b)).Mul(c)), must(a.Mul(must(b.Mul(c))))},
			{"a*1 = a", must(a.Mul(Dimension{})), a},
			{"a/a = 1", must(a.Div(a)), Dimension{}},
			{"(a*b)/b = a", must(must(a.Mul(b)).Div(b)), a},
			{"(a*b)^n = a^n*b^n", must(must(a.Mul(b)).Pow(n, 1)), must(must(a.Pow(n, 1)).Mul(must(b.Pow(n, 1))))},
			{"(a^n)^(1/n) = a", must(must(a.Pow(n, 1)).Pow(1, n)), a},
			{"(a^(1/n))^n = a", must(must(a.Pow(1, n)).Pow(n, 1)), a},
			{"a^-1 = 1/a", must(a.Pow(-1, 1)), must(Dimension{}.Div(a))},
			{"a^(n/-1) = a^-n", must(a.Pow(n, -1)), must(a.Pow(-n, 1))},
		} {
			if law.left != law.right {
				t.Fatalf("%s: %s and %s", law.name, law.left.Base(), law.right.Base())
			}
		}
	})
}

// The base units that a dimension is written in are a unit of that dimension, and it has words.
func TestDimensionBaseParses(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := anyDimension.Draw(t, "d")
		if d.Words() == "" || d.Article() == "" {
			t.Fatalf("%s has no words", d.Base())
		}
		if d.IsNumber() {
			return
		}
		u, err := Parse(d.Base())
		if err != nil || u.Dim() != d || u.ToSI(3) != 3 {
			t.Fatalf("%s: %v, factor %v", d.Base(), err, u.ToSI(1))
		}
	})
}

func TestQuantities(t *testing.T) {
	for _, row := range []struct{ name, unit string }{
		{"number", ""}, {"angle", "rad"}, {"strain", "ustrain"}, {"length", "m"}, {"area", "m^2"}, {"volume", "m^3"},
		{"section modulus", "m^3"}, {"section-modulus", "m^3"}, {"section_modulus", "m^3"}, {"fourth-power-length", "m^4"},
		{"second moment of area", "m^4"}, {"force", "N"}, {"moment", "N*m"}, {"energy", "J"}, {"stress", "Pa"}, {"pressure", "Pa"},
		{"modulus", "Pa"}, {"line-load", "N/m"}, {"line load", "N/m"}, {"stiffness", "N/m"}, {"density", "kg/m^3"}, {"weight-density", "N/m^3"},
		{"temperature-difference", "K"}, {"temperature", "K"}, {"per-temperature", "1/K"}, {"power", "W"}, {"frequency", "Hz"},
		{"time", "s"}, {"mass", "kg"}, {"speed", "m/s"}, {"acceleration", "m/s^2"}, {"rotational-stiffness", "N*m"},
	} {
		d, ok := QuantityByName(row.name)
		if !ok || d != dimOf(row.unit) {
			t.Errorf("%s is %q (%v), want the dimension of %s", row.name, d.Base(), ok, row.unit)
		}
		if point := QuantityPoint(row.name); point != (row.name == "temperature") {
			t.Errorf("%s is a point: %v", row.name, point)
		}
	}
	if _, ok := QuantityByName("colour"); ok {
		t.Error("colour is a quantity")
	}
	seen := map[string]bool{}
	for _, q := range Quantities() {
		for _, name := range append(q.Aliases, q.Name) {
			if seen[name] {
				t.Errorf("two quantities are called %s", name)
			}
			seen[name] = true
			if d, ok := QuantityByName(name); !ok || d != q.Dim {
				t.Errorf("%s is not found by its name", name)
			}
		}
	}
}
