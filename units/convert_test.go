package units

import (
	"math"
	"math/big"
	"strings"
	"testing"
)

func TestConvert(t *testing.T) {
	for _, row := range []struct {
		x, from, to string
		value       float64
		exact       string
	}{
		{"48", "kip", "kN", 213.514637532504, "1 kip = 4.4482216152605 kN"},
		{"1", "kN", "kip", 0.22480894309971047, "1 kN = 2000000000000/8896443230521 kip"},
		{"180", "deg", "rad", math.Pi, "1 deg = π/180 rad"},
		{"1", "rad", "deg", 180 / math.Pi, "1 rad = 180/π deg"},
		{"1", "deg", "arcmin", 60, "1 deg = 60 arcmin"},
		{"1", "1/deg^2", "1/rad^2", 32400 / (math.Pi * math.Pi), "1 1/deg^2 = 32400/π^2 1/rad^2"},
		{"1", "in", "mm", 25.4, "1 in = 25.4 mm"},
		{"5", "%", "permille", 50, "1 % = 10 permille"},
		{"5", "%", "", 0.05, "1 % = 0.01"},
		{"0.05", "", "%", 5, "1 = 100 %"},
		{"20", "degC", "degF", 68, "x degC = (1.8*x + 32) degF"},
		{"68", "degF", "degC", 20, "x degF = (5/9*x - 160/9) degC"},
		{"20", "degC", "°C", 20, "x degC = x °C"},
		{"9", "degR", "K", 5, "1 degR = 5/9 K"},
		{"1", "ksi*in^(1/2)", "MPa*m^(1/2)", 1.0988434941087548, "1 ksi*in^(1/2) ≈ 1.0988434941087548 MPa*m^(1/2)"},
		{"1", "J", "N*m", 1, "1 J = 1 N*m"},
	} {
		x, _ := new(big.Rat).SetString(row.x)
		var from, to Unit
		if row.from != "" {
			from = MustParse(row.from)
		}
		if row.to != "" {
			to = MustParse(row.to)
		}
		value, exact, err := Convert(x, from, to)
		if err != nil || value != row.value || exact != row.exact {
			t.Errorf("%s %s in %s: %v, %s (%v), want %v, %s", row.x, row.from, row.to, value, exact, err, row.value, row.exact)
		}
	}
	for _, row := range []struct{ from, to, message string }{
		{"kN", "MPa", "`kN` is a force and `MPa` is a stress"},
		{"kN", "%", "`kN` is a force and `%` is a plain number"},
		{"degC", "K", "`degC` is a point of temperature and `K` a difference"},
		{"degC", "kN", "`degC` is a temperature and `kN` is a force"},
		{"degR", "degF", "`degR` is a temperature difference and `degF` a point"},
	} {
		_, _, err := Convert(big.NewRat(1, 1), MustParse(row.from), MustParse(row.to))
		if err == nil || !strings.Contains(err.Error(), row.message) {
			t.Errorf("%s in %s: %v", row.from, row.to, err)
		}
	}
}

func TestCatalogue(t *testing.T) {
	order := []string{}
	for _, e := range Catalogue() {
		if len(order) == 0 || order[len(order)-1] != e.Quantity {
			order = append(order, e.Quantity)
		}
		u, ok := Lookup(e.Name)
		d, known := QuantityByName(e.Quantity)
		if !ok || !known || u.Dim() != d || u.IsPoint() != QuantityPoint(e.Quantity) {
			t.Errorf("%s is listed under %s", e.Name, e.Quantity)
		}
		if e.Definition == "" || e.Factor == "" || e.Source == "" || e.Printed == "" {
			t.Errorf("%s is listed without its particulars: %+v", e.Name, e)
		}
		for _, name := range e.Aliases {
			if a, ok := Lookup(name); !ok || a.Dim() != u.Dim() || a.ToSI(1) != u.ToSI(1) || a.Pretty() != u.Pretty() {
				t.Errorf("%s is not the same as %s", name, e.Name)
			}
		}
		for _, p := range e.Prefixes {
			if _, ok := Lookup(p + e.Name); !ok {
				t.Errorf("%s%s is not known", p, e.Name)
			}
		}
	}
	seen := map[string]bool{}
	for _, q := range order {
		if seen[q] {
			t.Errorf("%s is listed in two places", q)
		}
		seen[q] = true
	}
}

// What stands in section 7 of the notation, name by name.
func TestNotationsUnitsAreKnown(t *testing.T) {
	for _, name := range strings.Fields(`
		nm um µm mm cm dm m km in ft yd mi mil ha L mL
		rad mrad deg arcmin arcsec grad s ms min h d
		kg g mg t lbm slug oz
		N kN MN daN kgf tf lbf kip tonf ozf
		Pa kPa MPa GPa hPa psi ksi psf ksf bar mbar atm plf klf pli pcf
		J kJ MJ W kW MW hp Hz kHz rpm K degC degF degR °C °F ° % permille ppm ustrain A mA V kV Ω kΩ`) {
		if !IsUnitName(name) {
			t.Errorf("%s is not known", name)
		}
	}
	if u, ok := Lookup("lb"); ok {
		t.Errorf("lb is %s", u)
	}
	for _, name := range []string{"lb", "ton", "mPa", "Mm", "kips", "kin", "mft", "", "1", "N*m"} {
		if IsUnitName(name) {
			t.Errorf("%q is a unit's name", name)
		}
	}
}
