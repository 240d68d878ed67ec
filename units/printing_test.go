package units

import (
	"testing"

	"pgregory.net/rapid"
)

func TestDefaultUnits(t *testing.T) {
	for _, row := range []struct{ of, si, us, usPretty string }{
		{"m", "mm", "in", "in"},
		{"m^2", "mm^2", "in^2", "in²"},
		{"m^3", "mm^3", "in^3", "in³"},
		{"m^4", "mm^4", "in^4", "in⁴"},
		{"N", "kN", "kip", "kip"},
		{"J", "kN*m", "kip*ft", "kip·ft"},
		{"N/m", "kN/m", "kip/ft", "kip/ft"},
		{"Pa", "MPa", "ksi", "ksi"},
		{"g", "kg", "lbm", "lbm"},
		{"kg/m^3", "kg/m^3", "lbm/ft^3", "lbm/ft³"},
		{"N/m^3", "kN/m^3", "lbf/ft^3", "lbf/ft³"},
		{"h", "s", "s", "s"},
		{"rpm", "Hz", "Hz", "Hz"},
		{"km/h", "m/s", "ft/s", "ft/s"},
		{"ft/s^2", "m/s^2", "ft/s^2", "ft/s²"},
		{"W", "kW", "hp", "hp"},
		{"K", "K", "degR", "°F"},
		{"1/K", "1/K", "1/degF", "1/°F"},
		{"", "", "", ""},
		{"deg", "", "", ""},
		// all else
		{"m^6", "m^6", "in^6", "in⁶"},
		{"N*m^2", "kg*m^3/s^2", "lbf*in^2", "lbf·in²"},
		{"kg*m^2", "kg*m^2", "lbf*in*s^2", "lbf·in·s²"},
		{"kg/s", "kg/s", "lbf*s/in", "lbf·s/in"},
		{"MPa*m^(1/2)", "kg/(m^(1/2)*s^2)", "lbf/in^(3/2)", "lbf/in³ᐟ²"},
		{"W/(m*K)", "kg*m/(s^3*K)", "lbf/(s*degR)", "lbf/(s·°R)"},
		{"1/m", "1/m", "1/in", "1/in"},
		{"m/s^3", "m/s^3", "in/s^3", "in/s³"},
		{"A", "A", "A", "A"},
		{"V", "kg*m^2/(s^3*A)", "lbf*in/(s*A)", "lbf·in/(s·A)"},
	} {
		d := dimOf(row.of)
		if got := (Printing{}).UnitFor(d, false); got.String() != row.si || got.Dim() != d {
			t.Errorf("%s is printed in %s, want %s", row.of, got, row.si)
		}
		got := Printing{System: US}.UnitFor(d, false)
		if got.String() != row.us || got.Pretty() != row.usPretty || got.Dim() != d {
			t.Errorf("%s is printed in %s (%s) in the US, want %s (%s)", row.of, got, got.Pretty(), row.us, row.usPretty)
		}
	}
}

func TestPreferredUnits(t *testing.T) {
	list := func(texts ...string) []Unit {
		var units []Unit
		for _, text := range texts {
			units = append(units, MustParse(text))
		}
		return units
	}
	p := Printing{Preferred: list("N", "kN", "cm", "N*mm", "degF", "degR", "N/mm^2", "MPa", "%")}
	for _, row := range []struct {
		of    string
		point bool
		want  string
	}{
		{"N", false, "N"},
		{"m", false, "cm"},
		{"m^2", false, "mm^2"},
		{"J", false, "N*mm"},
		{"K", true, "degF"},
		{"K", false, "degR"},
		{"Pa", false, "N/mm^2"},
		{"", false, "%"},
	} {
		if got := p.UnitFor(dimOf(row.of), row.point); got.String() != row.want {
			t.Errorf("%s (point %v) is printed in %s, want %s", row.of, row.point, got, row.want)
		}
	}
	for _, row := range []struct {
		printing Printing
		of       string
		point    bool
		want     string
	}{
		{Printing{}, "K", true, "degC"},
		{Printing{System: US}, "K", true, "degF"},
		{Printing{Preferred: list("K")}, "K", true, "degC"},
		{Printing{Preferred: list("degC")}, "K", false, "K"},
		{Printing{Preferred: list("J")}, "N*m", false, "kN*m"},
		{Printing{Preferred: list("kJ", "kip-ft")}, "N*m", false, "kip-ft"},
		{Printing{Preferred: list("kW")}, "W", false, "kW"},
		{Printing{Preferred: list("J/s")}, "W", false, "J/s"},
	} {
		if got := row.printing.UnitFor(dimOf(row.of), row.point); got.String() != row.want {
			t.Errorf("%s is printed in %s, want %s", row.of, got, row.want)
		}
	}
}

// Every dimension has a printed unit in both systems, also at the bound.
func TestEveryDimensionIsPrinted(t *testing.T) {
	check := func(d Dimension) bool {
		for _, system := range []System{SI, US} {
			u := Printing{System: system}.UnitFor(d, false)
			if u.Dim() != d || d.IsNumber() != (u.Pretty() == "") || u.IsPoint() {
				return false
			}
		}
		return true
	}
	rapid.Check(t, func(t *rapid.T) {
		if d := anyDimension.Draw(t, "d"); !check(d) {
			t.Fatal(d.Base())
		}
	})
	var far Dimension
	for i := range far.exp {
		far.exp[i], _ = newExponent(100, 99)
	}
	if !check(far) {
		t.Error(far.Base())
	}
	for _, text := range []string{"in^100", "kg^100", "s^-100", "kg^50", "kg^60/s^20", "kg^100"} {
		if d := dimOf(text); !check(d) {
			t.Error(d.Base())
		}
	}
}

func TestZeroUnit(t *testing.T) {
	var u Unit
	if !u.Dim().IsNumber() || u.String() != "" || u.Pretty() != "" || u.ToSI(3) != 3 || u.FromSI(3) != 3 || u.IsPoint() || u.IsAngular() {
		t.Errorf("the zero unit is %q", u)
	}
	r, pi, ok := u.Exact()
	if r.RatString() != "1" || pi != 0 || !ok {
		t.Errorf("its factor is %s, π^%d, %v", r, pi, ok)
	}
}
