package units

import (
	"fmt"
	"math/big"
	"strings"
)

// unitRow is one line of the table of units. To add a unit, add a row: everything else follows.
type unitRow struct {
	quantity string // what it measures, as the list of units is grouped
	name     string
	aliases  string // other spellings, space-separated
	printed  string // on a page, where it differs from the name
	define   string // an exact number, pi/ before or not, and a unit of a row above; "" for a base unit
	zero     string // a temperature scale's zero above absolute zero, in its own degrees
	prefixes string // the SI prefixes that the trade uses with it
	system   System
	both     bool // used under either system
	source   string
}

const (
	siBrochure = "SI Brochure, 9th ed."
	nistB8     = "NIST SP 811, B.8"
	common     = "common practice"
)

var unitRows = []unitRow{
	{quantity: "angle", name: "rad", define: "1", prefixes: "u m", both: true, source: siBrochure},
	{quantity: "angle", name: "deg", aliases: "°", printed: "°", define: "pi/180 rad", both: true, source: siBrochure},
	{quantity: "angle", name: "arcmin", printed: "′", define: "1/60 deg", both: true, source: siBrochure},
	{quantity: "angle", name: "arcsec", printed: "″", define: "1/60 arcmin", both: true, source: siBrochure},
	{quantity: "angle", name: "grad", define: "pi/200 rad", both: true, source: nistB8},
	{quantity: "ratio", name: "%", define: "1/100", both: true, source: siBrochure},
	{quantity: "ratio", name: "permille", aliases: "‰", printed: "‰", define: "1/1000", both: true, source: common},
	{quantity: "ratio", name: "ppm", define: "1/1000000", both: true, source: "ISO 80000-1"},
	{quantity: "ratio", name: "ustrain", aliases: "µstrain", printed: "µstrain", define: "1/1000000", both: true, source: common},

	{quantity: "length", name: "m", prefixes: "n u m c d k", source: siBrochure},
	{quantity: "length", name: "in", define: "25.4 mm", system: US, source: nistB8},
	{quantity: "length", name: "ft", define: "12 in", system: US, source: nistB8},
	{quantity: "length", name: "yd", define: "3 ft", system: US, source: nistB8},
	{quantity: "length", name: "mi", define: "5280 ft", system: US, source: nistB8},
	{quantity: "length", name: "mil", define: "1/1000 in", system: US, source: nistB8},

	{quantity: "area", name: "ha", define: "10000 m^2", source: siBrochure},
	{quantity: "volume", name: "L", define: "1 dm^3", prefixes: "u m c d h", source: siBrochure},

	{quantity: "time", name: "s", prefixes: "n u m", both: true, source: siBrochure},
	{quantity: "time", name: "min", define: "60 s", both: true, source: siBrochure},
	{quantity: "time", name: "h", define: "60 min", both: true, source: siBrochure},
	{quantity: "time", name: "d", define: "24 h", both: true, source: siBrochure},

	{quantity: "mass", name: "kg", source: siBrochure},
	{quantity: "mass", name: "g", define: "1/1000 kg", prefixes: "u m M", source: siBrochure},
	{quantity: "mass", name: "t", define: "1000 kg", prefixes: "k", source: siBrochure},
	{quantity: "mass", name: "lbm", define: "0.45359237 kg", system: US, source: nistB8},
	{quantity: "mass", name: "oz", define: "1/16 lbm", system: US, source: nistB8},

	{quantity: "force", name: "N", define: "1 kg*m/s^2", prefixes: "u m da k M G", source: siBrochure},
	{quantity: "force", name: "kgf", define: "9.80665 N", source: nistB8},
	{quantity: "force", name: "tf", define: "1000 kgf", source: common},
	{quantity: "force", name: "lbf", define: "0.45359237 kgf", system: US, source: nistB8},
	{quantity: "force", name: "kip", define: "1000 lbf", system: US, source: nistB8},
	{quantity: "force", name: "tonf", define: "2000 lbf", system: US, source: nistB8},
	{quantity: "force", name: "ozf", define: "1/16 lbf", system: US, source: nistB8},
	{quantity: "mass", name: "slug", define: "1 lbf*s^2/ft", system: US, source: nistB8},

	{quantity: "stress", name: "Pa", define: "1 N/m^2", prefixes: "h k M G", source: siBrochure},
	{quantity: "stress", name: "bar", define: "100000 Pa", prefixes: "m", source: nistB8},
	{quantity: "stress", name: "atm", define: "101325 Pa", both: true, source: nistB8},
	{quantity: "stress", name: "psi", define: "1 lbf/in^2", system: US, source: nistB8},
	{quantity: "stress", name: "ksi", define: "1 kip/in^2", system: US, source: nistB8},
	{quantity: "stress", name: "psf", define: "1 lbf/ft^2", system: US, source: nistB8},
	{quantity: "stress", name: "ksf", define: "1 kip/ft^2", system: US, source: common},

	{quantity: "line load", name: "plf", define: "1 lbf/ft", system: US, source: nistB8},
	{quantity: "line load", name: "klf", define: "1 kip/ft", system: US, source: common},
	{quantity: "line load", name: "pli", define: "1 lbf/in", system: US, source: nistB8},
	{quantity: "weight density", name: "pcf", define: "1 lbf/ft^3", system: US, source: common},

	{quantity: "energy", name: "J", define: "1 N*m", prefixes: "m k M G", source: siBrochure},
	{quantity: "power", name: "W", define: "1 J/s", prefixes: "m k M G", source: siBrochure},
	{quantity: "power", name: "hp", define: "550 ft*lbf/s", system: US, source: nistB8},
	{quantity: "frequency", name: "Hz", define: "1 1/s", prefixes: "m k M G", both: true, source: siBrochure},
	{quantity: "frequency", name: "rpm", define: "1/60 Hz", both: true, source: common},

	{quantity: "temperature difference", name: "K", prefixes: "m", source: siBrochure},
	{quantity: "temperature", name: "degC", aliases: "°C", printed: "°C", define: "1 K", zero: "273.15", source: siBrochure},
	{quantity: "temperature", name: "degF", aliases: "°F", printed: "°F", define: "5/9 K", zero: "459.67", system: US, source: nistB8},
	{quantity: "temperature difference", name: "degR", aliases: "°R", printed: "°R", define: "5/9 K", system: US, source: nistB8},

	{quantity: "electric current", name: "A", prefixes: "m k", both: true, source: siBrochure},
	{quantity: "voltage", name: "V", define: "1 W/A", prefixes: "m k", both: true, source: siBrochure},
	{quantity: "electric resistance", name: "ohm", aliases: "Ω", printed: "Ω", define: "1 V/A", prefixes: "m k M", both: true, source: siBrochure},
	{quantity: "amount of substance", name: "mol", prefixes: "m k", both: true, source: siBrochure},
	{quantity: "luminous intensity", name: "cd", both: true, source: siBrochure},
}

// lookalikes are the signs that have two code points each: micro (U+00B5, and the Greek letter
// U+03BC) and ohm (the Greek letter U+03A9, and U+2126). Both are typed; the table has the first.
var lookalikes = strings.NewReplacer("\u00b5", "\u03bc", "\u03a9", "\u2126")

// prefix is an SI prefix with the spellings that are accepted; the first names it in the table
// and the last is printed.
type prefix struct {
	spellings []string
	factor    factor
}

var prefixes = []prefix{
	{[]string{"n"}, factor{num: 1, den: 1e9}},
	{[]string{"u", "\u00b5"}, factor{num: 1, den: 1e6}},
	{[]string{"m"}, factor{num: 1, den: 1e3}},
	{[]string{"c"}, factor{num: 1, den: 100}},
	{[]string{"d"}, factor{num: 1, den: 10}},
	{[]string{"da"}, factor{num: 10, den: 1}},
	{[]string{"h"}, factor{num: 100, den: 1}},
	{[]string{"k"}, factor{num: 1e3, den: 1}},
	{[]string{"M"}, factor{num: 1e6, den: 1}},
	{[]string{"G"}, factor{num: 1e9, den: 1}},
}

// table is every unit name that is known, prefixes included.
type table struct {
	atoms map[string]*atom
	names []string // in the catalogue's order
	rows  []*atom  // the atom of each row
}

var catalogue = buildTable()

func buildTable() *table {
	t := &table{atoms: map[string]*atom{}}
	for _, row := range unitRows {
		t.addRow(row)
	}
	return t
}

// addRow defines a row's names. A faulty table is a fault of the program, found by the first
// test that runs, so it panics.
func (t *table) addRow(row unitRow) {
	base := t.define(row)
	t.rows = append(t.rows, t.addAtom(base, row.name))
	spellings := append([]string{row.name}, strings.Fields(row.aliases)...)
	for _, s := range spellings[1:] {
		t.addAtom(base, s)
	}
	for _, p := range strings.Fields(row.prefixes) {
		for _, pre := range prefixes {
			if pre.spellings[0] != p {
				continue
			}
			scaled := base
			scaled.factor = pre.factor.mul(base.factor)
			scaled.printed = pre.spellings[len(pre.spellings)-1] + base.printed
			for _, ps := range pre.spellings {
				for _, s := range spellings {
					t.addAtom(scaled, ps+s)
				}
			}
		}
	}
}

func (t *table) addAtom(a atom, name string) *atom {
	if other := lookalikes.Replace(name); other != name {
		t.addName(a, other)
	}
	return t.addName(a, name)
}

func (t *table) addName(a atom, name string) *atom {
	if t.atoms[name] != nil {
		panic("two units are called " + name)
	}
	a.name = name
	p, err := newParsed(name, []term{{atom: &a, pow: exponent{num: 1}, end: len(name)}})
	if err != nil {
		panic(err)
	}
	a.unit = Unit{p: p}
	t.atoms[name] = &a
	t.names = append(t.names, name)
	return &a
}

// define reads a row's definition by the rows above it.
func (t *table) define(row unitRow) atom {
	a := atom{printed: row.printed, factor: factorOne}
	if a.printed == "" {
		a.printed = row.name
	}
	if row.define == "" {
		for i, name := range baseNames {
			if name == row.name {
				a.dim.exp[i].num = 1
				return a
			}
		}
		panic(row.name + " is no base unit")
	}
	number, unitText, _ := strings.Cut(row.define, " ")
	rational, angle := strings.CutPrefix(number, "pi/")
	if angle {
		rational, a.factor.pi = "1/"+rational, 1
	}
	a.factor = a.factor.mul(factorOf(rational))
	if unitText != "" {
		u, perr := t.parse(unitText)
		if perr != nil {
			panic(fmt.Sprintf("%s: %s", row.name, perr.Message))
		}
		a.dim = u.p.dim
		a.factor = a.factor.mul(u.p.factor)
	}
	a.angle = row.name == "rad" || a.factor.pi != 0
	a.joule = row.name == "J"
	if row.zero != "" {
		a.zero = new(big.Rat).Mul(factorOf(row.zero).big(), a.factor.big())
	}
	return a
}

func factorOf(number string) factor {
	r, ok := new(big.Rat).SetString(number)
	if !ok {
		panic("no number: " + number)
	}
	return newFactor(r, 0)
}

// Entry is a unit as the list of units shows it.
type Entry struct {
	Quantity   string
	Name       string
	Aliases    []string
	Printed    string   // as it is printed on a page
	Definition string   // by other units: "25.4 mm", "base unit"
	Factor     string   // the exact factor to SI: "0.0254", "π/180"
	SI         string   // the product of SI base units that the factor goes with
	Prefixes   []string // the SI prefixes it takes
	System     string   // "SI", "US", or "" where it is used under both
	Source     string
}

// Catalogue lists the units, those of one quantity together, in the table's order.
func Catalogue() []Entry {
	var list []Entry
	listed := map[string]bool{}
	for _, first := range unitRows {
		if listed[first.quantity] {
			continue
		}
		listed[first.quantity] = true
		for i, row := range unitRows {
			if row.quantity == first.quantity {
				list = append(list, row.entry(catalogue.rows[i]))
			}
		}
	}
	return list
}

func (row unitRow) entry(a *atom) Entry {
	e := Entry{
		Quantity: row.quantity, Name: row.name, Aliases: strings.Fields(row.aliases), Printed: a.printed,
		Definition: strings.Replace(row.define, "pi", "π", 1), Factor: a.factor.String(), SI: a.dim.Base(),
		Prefixes: strings.Fields(row.prefixes), Source: row.source,
	}
	for i, p := range e.Prefixes {
		if p == "u" {
			e.Prefixes[i] = "µ"
		}
	}
	switch {
	case row.define == "":
		e.Definition = "base unit"
	case row.zero != "":
		e.Definition += "; 0 " + a.printed + " is " + row.zero + " " + a.printed + " above absolute zero"
	}
	if !row.both {
		e.System = row.system.String()
	}
	return e
}
