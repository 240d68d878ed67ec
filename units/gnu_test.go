package units

import (
	"math"
	"os"
	"os/exec"
	"strconv"
	"strings"
	"testing"
)

// gnuNames says what a unit of the catalogue is called in the definitions of GNU units (Debian's
// package `units`), and so which convention is meant where several are in use.
var gnuNames = map[string]struct{ name, convention string }{
	"rad":      {"radian", ""},
	"deg":      {"degree", ""},
	"arcmin":   {"arcmin", ""},
	"arcsec":   {"arcsec", ""},
	"grad":     {"grade", "the gon, 400 to a turn"},
	"%":        {"percent", ""},
	"permille": {"0.001", "not defined there"},
	"ppm":      {"ppm", ""},
	"ustrain":  {"1e-6", "not defined there"},
	"m":        {"m", ""},
	"in":       {"inch", "the international inch, not the survey inch"},
	"ft":       {"foot", "the international foot, not the US survey foot"},
	"yd":       {"yard", ""},
	"mi":       {"mile", "the statute mile of 5280 international feet"},
	"mil":      {"mil", "a thousandth of an inch; the angle of that name is not meant"},
	"ha":       {"hectare", ""},
	"L":        {"liter", "a cubic decimetre since 1964"},
	"s":        {"s", ""},
	"min":      {"minute", ""},
	"h":        {"hour", ""},
	"d":        {"day", ""},
	"kg":       {"kg", ""},
	"g":        {"g", ""},
	"t":        {"tonne", "the metric tonne, 1,000 kg; neither the short nor the long ton"},
	"lbm":      {"pound", "avoirdupois"},
	"oz":       {"ounce", "avoirdupois, 1/16 lb"},
	"N":        {"N", ""},
	"kgf":      {"kgf", "at standard gravity"},
	"tf":       {"tonne force", "the metric tonne's weight"},
	"lbf":      {"lbf", "at standard gravity"},
	"kip":      {"kip", ""},
	"tonf":     {"uston force", "the short ton's weight, 2,000 lbf"},
	"ozf":      {"ounce force", ""},
	"slug":     {"slug", ""},
	"Pa":       {"Pa", ""},
	"bar":      {"bar", ""},
	"atm":      {"atm", "the standard atmosphere, not the technical one of 1 kgf/cm^2"},
	"psi":      {"psi", ""},
	"ksi":      {"ksi", ""},
	"psf":      {"lbf/ft^2", "not defined there"},
	"ksf":      {"kip/ft^2", "not defined there"},
	"plf":      {"lbf/foot", "plf there is pounds of mass per foot; a line load is meant"},
	"klf":      {"kip/foot", "not defined there"},
	"pli":      {"lbf/inch", "pli there is pounds of mass per inch; a line load is meant"},
	"pcf":      {"lbf/ft^3", "not defined there; a weight density, not the mass density lb/ft^3"},
	"J":        {"J", ""},
	"W":        {"W", ""},
	"hp":       {"mechanicalhorsepower", "550 ft·lbf/s; neither metric (735.5 W) nor electric (746 W) nor boiler horsepower"},
	"Hz":       {"Hz", ""},
	"rpm":      {"1/minute", "a frequency, turns per minute; rpm there is the angular speed 2π/60 rad/s"},
	"K":        {"K", ""},
	"degC":     {"degC", "the degree as a difference"},
	"degF":     {"degF", "the degree as a difference"},
	"degR":     {"degR", ""},
	"A":        {"A", ""},
	"V":        {"V", ""},
	"ohm":      {"ohm", ""},
	"mol":      {"mol", ""},
	"cd":       {"cd", ""},
}

// TestGNUUnits compares every factor of the catalogue, prefixes included, with GNU units.
func TestGNUUnits(t *testing.T) {
	program, err := exec.LookPath("units")
	if err != nil {
		if os.Getenv("CI") == "true" {
			t.Fatal("GNU units is not installed: apt-get install units")
		}
		t.Skip("GNU units is not installed")
	}
	type pair struct {
		ours Unit
		gnu  string
	}
	var pairs []pair
	var asked strings.Builder
	for _, e := range Catalogue() {
		gnu, ok := gnuNames[e.Name]
		if !ok {
			t.Errorf("%s has no name of GNU units beside it", e.Name)
			continue
		}
		for _, p := range append([]string{""}, e.Prefixes...) {
			ours, ok := Lookup(p + e.Name)
			if !ok {
				t.Errorf("%s%s is listed and not known", p, e.Name)
				continue
			}
			si := ours.Dim().Base()
			if e.Quantity == "angle" {
				si = "radian"
			} else if si == "" {
				si = "1"
			}
			gnuUnit := gnu.name
			if p != "" {
				gnuUnit = strings.Replace(p, "µ", "u", 1) + gnu.name
			}
			pairs = append(pairs, pair{ours, gnuUnit})
			asked.WriteString(gnuUnit + "\n" + si + "\n")
		}
	}
	command := exec.Command(program, "--terse", "--output-format", "%.17g")
	command.Env = append(os.Environ(), "LC_ALL=C.UTF-8", "HOME="+t.TempDir())
	command.Stdin = strings.NewReader(asked.String())
	out, err := command.CombinedOutput()
	if err != nil {
		t.Fatalf("%v\n%s", err, out)
	}
	answers := strings.Split(strings.TrimSpace(string(out)), "\n")
	if len(answers) != len(pairs) {
		t.Fatalf("%d answers to %d questions:\n%s", len(answers), len(pairs), out)
	}
	for i, p := range pairs {
		want, err := strconv.ParseFloat(answers[i], 64)
		if err != nil {
			t.Errorf("%s: GNU units says %s", p.gnu, answers[i])
			continue
		}
		got := p.ours.get().toSI.hi
		if math.Abs(got-want) > 1e-15*want {
			t.Errorf("%s is %.17g, GNU units has %.17g for %s", p.ours, got, want, p.gnu)
		}
	}
}

func TestGNUNamesAreOurs(t *testing.T) {
	for name := range gnuNames {
		if !IsUnitName(name) {
			t.Errorf("%s is no unit of the catalogue", name)
		}
	}
}
