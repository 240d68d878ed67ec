package units

import (
	"math"
	"math/big"
	"strings"
	"testing"
)

// The factors of NIST Special Publication 811 (2008), Appendix B, as they stand there: rounded to
// seven figures, or exact. The publication was not at hand when the table was written; the values
// and their sections are from memory of it. Each row is checked by rounding our exact factor to the figures printed there.
var nistFactors = []struct {
	unit, si, factor string
	source           string // the section, and the name under which the publication lists it
}{
	// Length
	{"in", "m", "2.54e-2", "B.8 inch (exact)"},
	{"ft", "m", "3.048e-1", "B.8 foot (exact)"},
	{"yd", "m", "9.144e-1", "B.8 yard (exact)"},
	{"mi", "m", "1.609344e3", "B.8 mile (exact)"},
	{"mil", "m", "2.54e-5", "B.8 mil (0.001 in) (exact)"},
	{"in", "cm", "2.54", "B.8 inch to centimetre (exact)"},
	{"mi", "km", "1.609344", "B.8 mile to kilometre (exact)"},
	{"mil", "mm", "2.54e-2", "B.8 mil to millimetre (exact)"},
	// Area, volume, second moment of area
	{"ha", "m^2", "1.0e4", "B.8 hectare (exact)"},
	{"in^2", "m^2", "6.4516e-4", "B.8 square inch (exact)"},
	{"ft^2", "m^2", "9.290304e-2", "B.8 square foot (exact)"},
	{"yd^2", "m^2", "8.361274e-1", "B.8 square yard"},
	{"mi^2", "m^2", "2.589988e6", "B.8 square mile"},
	{"L", "m^3", "1.0e-3", "B.8 liter (exact)"},
	{"in^3", "m^3", "1.638706e-5", "B.8 cubic inch"},
	{"ft^3", "m^3", "2.831685e-2", "B.8 cubic foot"},
	{"yd^3", "m^3", "7.645549e-1", "B.8 cubic yard"},
	{"in^4", "m^4", "4.162314e-7", "B.8 inch to the fourth power"},
	{"ft^4", "m^4", "8.630975e-3", "B.8 foot to the fourth power"},
	// Angle
	{"deg", "rad", "1.745329e-2", "B.8 degree (angle)"},
	{"arcmin", "rad", "2.908882e-4", "B.8 minute (angle)"},
	{"arcsec", "rad", "4.848137e-6", "B.8 second (angle)"},
	{"grad", "rad", "1.570796e-2", "B.8 gon (also called grade)"},
	{"grad", "deg", "9.0e-1", "B.8 gon to degree (exact)"},
	// Time, speed, acceleration, flow
	{"d", "s", "8.64e4", "B.8 day (exact)"},
	{"h", "s", "3.6e3", "B.8 hour (exact)"},
	{"min", "s", "6.0e1", "B.8 minute (exact)"},
	{"ft/s", "m/s", "3.048e-1", "B.8 foot per second (exact)"},
	{"ft/min", "m/s", "5.08e-3", "B.8 foot per minute (exact)"},
	{"ft/h", "m/s", "8.466667e-5", "B.8 foot per hour"},
	{"in/s", "m/s", "2.54e-2", "B.8 inch per second (exact)"},
	{"mi/h", "m/s", "4.4704e-1", "B.8 mile per hour (exact)"},
	{"mi/min", "m/s", "2.68224e1", "B.8 mile per minute (exact)"},
	{"km/h", "m/s", "2.777778e-1", "B.8 kilometer per hour"},
	{"ft/s^2", "m/s^2", "3.048e-1", "B.8 foot per second squared (exact)"},
	{"in/s^2", "m/s^2", "2.54e-2", "B.8 inch per second squared (exact)"},
	{"ft^3/s", "m^3/s", "2.831685e-2", "B.8 cubic foot per second"},
	{"ft^3/min", "m^3/s", "4.719474e-4", "B.8 cubic foot per minute"},
	{"in^3/min", "m^3/s", "2.731177e-7", "B.8 cubic inch per minute"},
	{"yd^3/min", "m^3/s", "1.274258e-2", "B.8 cubic yard per minute"},
	{"ft^2/s", "m^2/s", "9.290304e-2", "B.8 square foot per second (exact)"},
	// Mass and density
	{"t", "kg", "1.0e3", "B.8 ton, metric (exact)"},
	{"lbm", "kg", "4.535924e-1", "B.8 pound (avoirdupois)"},
	{"oz", "kg", "2.834952e-2", "B.8 ounce (avoirdupois)"},
	{"slug", "kg", "1.459390e1", "B.8 slug"},
	{"lbm/ft", "kg/m", "1.488164", "B.8 pound per foot"},
	{"lbm/in", "kg/m", "1.785797e1", "B.8 pound per inch"},
	{"lbm/yd", "kg/m", "4.960546e-1", "B.8 pound per yard"},
	{"lbm/ft^2", "kg/m^2", "4.882428", "B.8 pound per square foot"},
	{"oz/ft^2", "kg/m^2", "3.051517e-1", "B.8 ounce per square foot"},
	{"lbm/ft^3", "kg/m^3", "1.601846e1", "B.8 pound per cubic foot"},
	{"lbm/in^3", "kg/m^3", "2.767990e4", "B.8 pound per cubic inch"},
	{"lbm/yd^3", "kg/m^3", "5.932764e-1", "B.8 pound per cubic yard"},
	{"slug/ft^3", "kg/m^3", "5.153788e2", "B.8 slug per cubic foot"},
	{"oz/in^3", "kg/m^3", "1.729994e3", "B.8 ounce per cubic inch"},
	{"g/cm^3", "kg/m^3", "1.0e3", "B.8 gram per cubic centimeter (exact)"},
	{"lbm*ft^2", "kg*m^2", "4.214011e-2", "B.8 pound foot squared"},
	{"lbm*in^2", "kg*m^2", "2.926397e-4", "B.8 pound inch squared"},
	{"lbm/h", "kg/s", "1.259979e-4", "B.8 pound per hour"},
	{"lbm/min", "kg/s", "7.559873e-3", "B.8 pound per minute"},
	// Force
	{"kgf", "N", "9.80665", "B.8 kilogram-force (exact)"},
	{"lbf", "N", "4.448222", "B.8 pound-force"},
	{"kip", "N", "4.448222e3", "B.8 kip (1 kip = 1000 lbf)"},
	{"kip", "kN", "4.448222", "B.8 kip to kilonewton"},
	{"tonf", "N", "8.896443e3", "B.8 ton-force (2000 lbf)"},
	{"tonf", "kN", "8.896443", "B.8 ton-force (2000 lbf) to kilonewton"},
	{"ozf", "N", "2.780139e-1", "B.8 ounce (avoirdupois)-force"},
	{"lbf/lbm", "N/kg", "9.80665", "B.8 pound-force per pound (exact)"},
	// Moment and energy
	{"lbf*ft", "N*m", "1.355818", "B.8 pound-force foot"},
	{"lbf*in", "N*m", "1.129848e-1", "B.8 pound-force inch"},
	{"kgf*m", "N*m", "9.80665", "B.8 kilogram-force meter (exact)"},
	{"ozf*in", "N*m", "7.061552e-3", "B.8 ounce (avoirdupois)-force inch"},
	{"ft*lbf", "J", "1.355818", "B.8 foot pound-force"},
	{"lbf*ft/in", "N*m/m", "5.337866e1", "B.8 pound-force foot per inch"},
	{"lbf*in/in", "N*m/m", "4.448222", "B.8 pound-force inch per inch"},
	{"W*h", "J", "3.6e3", "B.8 watt hour (exact)"},
	{"kW*h", "MJ", "3.6", "B.8 kilowatt hour to megajoule (exact)"},
	// Line load
	{"lbf/ft", "N/m", "1.459390e1", "B.8 pound-force per foot"},
	{"plf", "N/m", "1.459390e1", "B.8 pound-force per foot"},
	{"lbf/in", "N/m", "1.751268e2", "B.8 pound-force per inch"},
	{"pli", "N/m", "1.751268e2", "B.8 pound-force per inch"},
	{"klf", "kN/m", "1.459390e1", "B.8 pound-force per foot, by the thousand"},
	// Stress and pressure
	{"psi", "Pa", "6.894757e3", "B.8 psi (pound-force per square inch)"},
	{"psi", "kPa", "6.894757", "B.8 psi to kilopascal"},
	{"ksi", "Pa", "6.894757e6", "B.8 kip per square inch (ksi)"},
	{"ksi", "kPa", "6.894757e3", "B.8 kip per square inch (ksi) to kilopascal"},
	{"psf", "Pa", "4.788026e1", "B.8 pound-force per square foot"},
	{"ksf", "kPa", "4.788026e1", "B.8 pound-force per square foot, by the thousand"},
	{"bar", "Pa", "1.0e5", "B.8 bar (exact)"},
	{"mbar", "Pa", "1.0e2", "B.8 millibar (exact)"},
	{"atm", "Pa", "1.01325e5", "B.8 atmosphere, standard (exact)"},
	{"kgf/cm^2", "Pa", "9.80665e4", "B.8 kilogram-force per square centimeter (exact)"},
	{"kgf/mm^2", "Pa", "9.80665e6", "B.8 kilogram-force per square millimeter (exact)"},
	{"kgf/m^2", "Pa", "9.80665", "B.8 kilogram-force per square meter (exact)"},
	{"lbf*s/ft^2", "Pa*s", "4.788026e1", "B.8 pound-force second per square foot"},
	{"lbf*s/in^2", "Pa*s", "6.894757e3", "B.8 pound-force second per square inch"},
	{"lbm/(ft*s)", "Pa*s", "1.488164", "B.8 pound per foot second"},
	{"slug/(ft*s)", "Pa*s", "4.788026e1", "B.8 slug per foot second"},
	// Weight density
	{"pcf", "N/m^3", "1.570875e2", "from B.8 pound-force per foot, 14.59390, over the square foot, 0.3048^2"},
	// Power and frequency
	{"hp", "W", "7.456999e2", "B.8 horsepower (550 ft·lbf/s)"},
	{"ft*lbf/s", "W", "1.355818", "B.8 foot pound-force per second"},
	{"ft*lbf/min", "W", "2.259697e-2", "B.8 foot pound-force per minute"},
	{"ft*lbf/h", "W", "3.766161e-4", "B.8 foot pound-force per hour"},
	{"rpm", "Hz", "1.666667e-2", "common practice: a frequency. B.8 lists revolution per minute (rpm) to rad/s, 1.047198e-1, which is 2π times this"},
	// Temperature
	{"degR", "K", "5.555556e-1", "B.8 degree Rankine"},
	{"1/degF", "1/K", "1.8", "B.8 degree Fahrenheit, interval: K = °F/1.8 (exact)"},
	{"1/degC", "1/K", "1.0", "B.8 degree Celsius, interval (exact)"},
}

func TestNIST(t *testing.T) {
	for _, row := range nistFactors {
		from, to := MustParse(row.unit), MustParse(row.si)
		if from.Dim() != to.Dim() {
			t.Errorf("%s is %s, %s is %s", row.unit, from.Dim().Words(), row.si, to.Dim().Words())
			continue
		}
		r, pi, _ := from.Exact()
		s, sPi, _ := to.Exact()
		r.Quo(r, s).Mul(r, piPower(pi-sPi))
		mantissa, _, _ := strings.Cut(row.factor, "e")
		decimals := 0
		if _, fraction, ok := strings.Cut(mantissa, "."); ok {
			decimals = len(fraction)
		}
		got := new(big.Float).SetPrec(200).SetRat(r).Text('e', decimals)
		want, _, err := big.ParseFloat(row.factor, 10, 200, big.ToNearestEven)
		if err != nil {
			t.Fatal(err)
		}
		if got != want.Text('e', decimals) {
			t.Errorf("1 %s is %s %s, NIST SP 811 has %s (%s)", row.unit, got, row.si, row.factor, row.source)
		}
		if strings.Contains(row.source, "(exact)") {
			if exact, _ := new(big.Rat).SetString(row.factor); r.Cmp(exact) != 0 {
				t.Errorf("1 %s is exactly %s %s, want %s (%s)", row.unit, r, row.si, row.factor, row.source)
			}
		}
	}
}

// Every unit that is no multiple by a prefix, and no definition of ours alone, has a row above.
func TestNISTCoversCatalogue(t *testing.T) {
	covered := map[string]bool{}
	for _, row := range nistFactors {
		for _, u := range []Unit{MustParse(row.unit), MustParse(row.si)} {
			for _, n := range u.Names() {
				covered[n.Name] = true
			}
		}
	}
	elsewhere := map[string]string{
		"%": "a hundredth by its name", "permille": "a thousandth by its name", "ppm": "a millionth by its name",
		"ustrain": "a millionth by its name", "tf": "1,000 kgf", "A": "base unit", "V": "W/A", "ohm": "V/A", "mol": "base unit", "cd": "base unit",
	}
	for _, e := range Catalogue() {
		if !covered[e.Name] && elsewhere[e.Name] == "" {
			t.Errorf("%s has no row from NIST SP 811", e.Name)
		}
	}
}

// NIST SP 811, B.9: t/°C = (t/°F - 32)/1.8 and T/K = t/°C + 273.15; the points are the ice and steam
// points and the scales' crossing, from memory.
func TestTemperaturePoints(t *testing.T) {
	for _, row := range []struct {
		value, unit string
		kelvin      float64
		back        float64
		backUnit    string
	}{
		{"20", "degC", 293.15, 68, "degF"},
		{"32", "degF", 273.15, 0, "degC"},
		{"212", "°F", 373.15, 100, "°C"},
		{"-40", "degF", 233.15, -40, "degC"},
		{"-459.67", "degF", 0, -273.15, "degC"},
		{"20.1", "degC", 293.25, 20.1, "degC"},
		{"98.6", "degF", 310.15, 37, "degC"},
	} {
		u := MustParse(row.unit)
		exact, _ := new(big.Rat).SetString(row.value)
		if got := u.LiteralToSI(exact); got != row.kelvin {
			t.Errorf("%s %s is %v K, want %v", row.value, row.unit, got, row.kelvin)
		}
		if got := u.ToSI(ratFloat(exact)); math.Abs(got-row.kelvin) > 1e-13 {
			t.Errorf("%s %s is %v K, want %v", row.value, row.unit, got, row.kelvin)
		}
		if got := MustParse(row.backUnit).FromSI(row.kelvin); got != row.back {
			t.Errorf("%v K is %v %s, want %v", row.kelvin, got, row.backUnit, row.back)
		}
	}
}
