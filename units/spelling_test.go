package units

import (
	"strings"
	"testing"
)

func TestMisspelled(t *testing.T) {
	for _, row := range []struct{ name, fix string }{
		// cases
		{"Kn", "kN"}, {"KN", "kN"}, {"kn", "kN"}, {"mpa", "MPa"}, {"Mpa", "MPa"}, {"MPA", "MPa"}, {"mPa", "MPa"}, {"kpa", "kPa"}, {"KPA", "kPa"},
		{"gpa", "GPa"}, {"PA", "Pa"}, {"PSI", "psi"}, {"Ksi", "ksi"}, {"KSI", "ksi"}, {"MM", "mm"}, {"Mm", "mm"}, {"CM", "cm"},
		{"IN", "in"}, {"Ft", "ft"}, {"KIP", "kip"}, {"Kip", "kip"}, {"LBF", "lbf"}, {"Lbm", "lbm"}, {"KG", "kg"}, {"Kg", "kg"},
		{"hz", "Hz"}, {"HZ", "Hz"}, {"khz", "kHz"}, {"RPM", "rpm"}, {"HP", "hp"}, {"kw", "kW"}, {"KW", "kW"}, {"DEG", "deg"}, {"Rad", "rad"},
		{"PPM", "ppm"}, {"BAR", "bar"}, {"degc", "degC"}, {"degf", "degF"}, {"DegC", "degC"}, {"°c", "°C"}, {"kj", "kJ"}, {"PLF", "plf"}, {"ml", "mL"},
		// plurals
		{"kips", "kip"}, {"Kips", "kip"}, {"KIPS", "kip"}, {"lbfs", "lbf"}, {"psis", "psi"}, {"slugs", "slug"}, {"mils", "mil"}, {"degs", "deg"}, {"kgs", "kg"}, {"rads", "rad"},
		{"bars", "bar"}, {"yds", "yd"}, {"mins", "min"}, {"hrs", "h"}, {"secs", "s"}, {"ins", "in"}, {"fts", "ft"}, {"tonfs", "tonf"},
		// long names
		{"inch", "in"}, {"inches", "in"}, {"Inches", "in"}, {"foot", "ft"}, {"feet", "ft"}, {"yards", "yd"}, {"miles", "mi"}, {"metre", "m"}, {"meter", "m"}, {"meters", "m"},
		{"millimetre", "mm"}, {"millimeters", "mm"}, {"centimetres", "cm"}, {"kilometers", "km"}, {"micrometre", "um"}, {"micron", "um"},
		{"newton", "N"}, {"newtons", "N"}, {"Newton", "N"}, {"kilonewton", "kN"}, {"kilonewtons", "kN"}, {"meganewton", "MN"}, {"decanewton", "daN"},
		{"pascal", "Pa"}, {"pascals", "Pa"}, {"megapascal", "MPa"}, {"Megapascals", "MPa"}, {"gigapascal", "GPa"}, {"hectopascal", "hPa"},
		{"second", "s"}, {"seconds", "s"}, {"sec", "s"}, {"minute", "min"}, {"minutes", "min"}, {"hour", "h"}, {"hr", "h"}, {"days", "d"},
		{"milliseconds", "ms"}, {"gram", "g"}, {"kilogram", "kg"}, {"kilograms", "kg"}, {"tonne", "t"}, {"tonnes", "t"}, {"kilotonne", "kt"},
		{"joule", "J"}, {"kilojoules", "kJ"}, {"watt", "W"}, {"kilowatts", "kW"}, {"hertz", "Hz"}, {"megahertz", "MHz"}, {"horsepower", "hp"},
		{"degree", "deg"}, {"degrees", "deg"}, {"radian", "rad"}, {"radians", "rad"}, {"milliradian", "mrad"}, {"arcminutes", "arcmin"},
		{"kelvin", "K"}, {"celsius", "degC"}, {"Celsius", "degC"}, {"fahrenheit", "degF"}, {"rankine", "degR"}, {"degK", "K"}, {"ºC", "degC"},
		{"percent", "%"}, {"microstrain", "ustrain"}, {"microstrains", "ustrain"}, {"µε", "ustrain"}, {"litre", "L"}, {"liters", "L"}, {"millilitre", "mL"}, {"hectare", "ha"},
		{"ohms", "ohm"}, {"kiloohm", "kohm"}, {"amps", "A"}, {"volts", "V"},
		// run together, powers without a sign
		{"kNm", "kN*m"}, {"Nm", "N*m"}, {"Nmm", "N*mm"}, {"KNm", "kN*m"}, {"knm", "kN*m"}, {"MNm", "MN*m"}, {"kipft", "kip*ft"}, {"ftkip", "ft*kip"}, {"ftlbf", "ft*lbf"},
		{"ftlb", "ft*lbf"}, {"inlbf", "in*lbf"}, {"kipin", "kip*in"}, {"ftkips", "ft*kip"},
		{"mm2", "mm^2"}, {"m3", "m^3"}, {"cm4", "cm^4"}, {"in4", "in^4"}, {"MM2", "mm^2"}, {"sec2", "s^2"},
		// trade
		{"psig", "psi"}, {"klb", "kip"}, {"pci", "lbf/in^3"}, {"kcf", "kip/ft^3"}, {"kli", "kip/in"}, {"mph", "mi/h"}, {"sqft", "ft^2"}, {"cc", "cm^3"}, {"gon", "grad"}, {"thou", "mil"},
		// only the author can tell
		{"lb", ""}, {"lbs", ""}, {"LB", ""}, {"LBS", ""}, {"Lbs", ""}, {"pound", ""}, {"pounds", ""}, {"ton", ""}, {"tons", ""}, {"Tons", ""}, {"ounce", ""}, {"ounces", ""}, {"mw", ""}, {"mn", ""},
	} {
		fix, ok := Misspelled(row.name)
		if !ok || fix != row.fix {
			t.Errorf("%s is written %q (%v), want %q", row.name, fix, ok, row.fix)
		}
		if fix != "" && !parses(fix) {
			t.Errorf("%s is written %s, which is no unit", row.name, fix)
		}
	}
	for _, name := range []string{"", "w", "x", "n", "k", "mm", "kN", "gamma", "f_y", "sigma_1", "width", "_", "²", strings.Repeat("s", 10000), "lbflbf", "kNkN"} {
		if fix, ok := Misspelled(name); ok {
			t.Errorf("%.20s is taken for %q", name, fix)
		}
	}
}

// The list holds no name that is right, and every spelling that it gives is a unit.
func TestMisspellingsList(t *testing.T) {
	for name, right := range misspellings {
		if IsUnitName(name) {
			t.Errorf("%s is a unit", name)
		}
		for _, r := range strings.Fields(right) {
			if !parses(r) {
				t.Errorf("%s is written %s, which is no unit", name, r)
			}
		}
	}
	for _, e := range Catalogue() {
		if len(e.Name) < 2 {
			continue
		}
		for _, name := range []string{strings.ToUpper(e.Name), strings.ToLower(e.Name), e.Name + "s"} {
			if IsUnitName(name) {
				continue
			}
			if _, ok := Misspelled(name); !ok {
				t.Errorf("%s is not taken for %s", name, e.Name)
			}
		}
	}
}

func TestSuggest(t *testing.T) {
	for _, row := range []struct{ name, want string }{
		{"ustrian", "ustrain"}, {"permile", "permille"}, {"degreC", "degC"}, {"arcmn", "arcmin"}, {"kpi", "kip"}, {"lbff", "lbf"}, {"radd", "rad"},
		{"w", ""}, {"", ""}, {"metr", ""}, {"colour", ""}, {strings.Repeat("m", 10000), ""},
	} {
		if got := Suggest(row.name); got != row.want {
			t.Errorf("nearest to %.20s is %q, want %q", row.name, got, row.want)
		}
	}
}

func TestDistance(t *testing.T) {
	for _, row := range []struct {
		a, b string
		want int
	}{
		{"", "", 0}, {"abc", "abc", 0}, {"abc", "ab", 1}, {"abc", "abd", 1}, {"abc", "acb", 1}, {"abc", "xyz", 3}, {"kip", "pik", 2}, {"abcd", "a", 3},
	} {
		if got := distance([]rune(row.a), []rune(row.b), 2); got != row.want {
			t.Errorf("from %s to %s it is %d, want %d", row.a, row.b, got, row.want)
		}
	}
}
