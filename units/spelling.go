package units

import (
	"strings"
	"unicode/utf8"
)

// misspellings gives the right spellings of what engineers write for units that have another
// name here. Two or more mean that the author must say which. Case variants, plurals, run-together
// products and long names with a prefix are found by rule.
var misspellings = map[string]string{
	"lb": "lbf lbm", "pound": "lbf lbm", "ton": "t tf tonf", "ounce": "oz ozf",
	"kipf": "kip", "klb": "kip", "klbf": "kip", "kp": "kgf", "kilopond": "kgf", "kgs": "kg", "tonne": "t", "kilogramme": "kg", "gramme": "g", "gm": "g", "Kgf": "kgf",
	"inch": "in", "inches": "in", "ins": "in", "foot": "ft", "feet": "ft", "yard": "yd", "mile": "mi", "thou": "mil", "micron": "um",
	"metre": "m", "meter": "m", "mtr": "m", "mts": "m",
	"second": "s", "sec": "s", "msec": "ms", "usec": "us", "minute": "min", "mins": "min", "hour": "h", "hr": "h", "hrs": "h", "day": "d",
	"gram": "g", "newton": "N", "pascal": "Pa", "joule": "J", "watt": "W", "hertz": "Hz", "cps": "Hz",
	"kelvin": "K", "celsius": "degC", "centigrade": "degC", "fahrenheit": "degF", "rankine": "degR", "degK": "K", "ºC": "degC", "ºF": "degF", "oC": "degC", "oF": "degF", "°K": "K",
	"degree": "deg", "º": "deg", "radian": "rad", "gon": "grad", "gradian": "grad", "moa": "arcmin",
	"arcminute": "arcmin", "arcsecond": "arcsec",
	"percent": "%", "pct": "%", "permil": "permille", "promille": "permille",
	"microstrain": "ustrain", "ue": "ustrain", "µe": "ustrain", "uε": "ustrain", "µε": "ustrain", "με": "ustrain",
	"horsepower": "hp", "bhp": "hp", "atmosphere": "atm",
	"litre": "L", "liter": "L", "ltr": "L", "ml": "mL", "cl": "cL", "dl": "dL", "hl": "hL", "hectare": "ha", "cc": "cm^3",
	"amp": "A", "ampere": "A", "volt": "V", "mole": "mol", "candela": "cd", "kn_m": "kN*m", "tfm": "tf*m",
	"psig": "psi", "psia": "psi", "lbsi": "psi", "kli": "kip/in", "lbin": "lbf*in", "lbft": "lbf*ft", "ftlb": "ft*lbf", "inlb": "in*lbf",
	"kpf": "kip/ft", "kcf": "kip/ft^3", "pci": "lbf/in^3", "kci": "kip/in^3", "Nmm2": "N/mm^2",
	"sqin": "in^2", "sqft": "ft^2", "sqm": "m^2", "sqmm": "mm^2", "sqcm": "cm^2", "sf": "ft^2", "cuin": "in^3", "cuft": "ft^3", "cum": "m^3", "cft": "ft^3",
	"mph": "mi/h", "kph": "km/h", "kmh": "km/h", "fps": "ft/s", "mps": "m/s",
}

// longPrefixes are the prefixes as they stand before a long name.
var longPrefixes = []struct{ long, short string }{
	{"nano", "n"}, {"micro", "u"}, {"milli", "m"}, {"centi", "c"}, {"deci", "d"}, {"deca", "da"}, {"hecto", "h"},
	{"kilo", "k"}, {"mega", "M"}, {"giga", "G"},
}

// misspelled returns the right spellings of a name that is no unit but was meant as one; more
// than one where only the author can tell, none where nothing is known.
func (t *table) misspelled(name string) []string {
	if utf8.RuneCountInString(name) < 2 && name != "º" { // one letter is a value's name as soon as a slip
		return nil
	}
	lower := strings.ToLower(name)
	for _, right := range [][]string{listed(name), listed(lower), t.runTogether(name), t.otherCase(name), t.longName(lower)} {
		if len(right) > 0 {
			return right
		}
	}
	if base := singular(name); base != name && utf8.RuneCountInString(base) > 1 {
		if t.atoms[base] != nil {
			return []string{base}
		}
		return t.misspelled(base)
	}
	return t.powerWithoutSign(name)
}

// listed looks a name up in the list of misspellings.
func listed(name string) []string { return strings.Fields(misspellings[name]) }

// longName reads kilonewtons and millimetre.
func (t *table) longName(lower string) []string {
	for _, p := range longPrefixes {
		rest, ok := strings.CutPrefix(lower, p.long)
		if !ok {
			continue
		}
		for _, base := range append(listed(singular(rest)), singular(rest)) {
			if t.atoms[p.short+base] != nil {
				return []string{p.short + base}
			}
		}
	}
	return nil
}

// otherCase finds the units that differ from a name in their case only.
func (t *table) otherCase(name string) []string {
	var right []string
	for _, known := range t.names {
		if len(known) == len(name) && strings.EqualFold(known, name) {
			right = append(right, known)
		}
	}
	return right
}

// runTogether splits kNm, Knm and ftlbf into a force and a length.
func (t *table) runTogether(name string) []string {
	for i := 1; i < len(name); i++ {
		a, b := t.anyCase(name[:i]), t.anyCase(name[i:])
		if a != nil && b != nil && (a.dim == dimForce && b.dim == dimLength || a.dim == dimLength && b.dim == dimForce) {
			return []string{a.name + "*" + b.name}
		}
	}
	return nil
}

// anyCase finds the unit of a name whose case may be wrong, if it is only one.
func (t *table) anyCase(name string) *atom {
	if a := t.atoms[name]; a != nil || len(name) < 2 {
		return a
	}
	if right := t.otherCase(name); len(right) == 1 {
		return t.atoms[right[0]]
	}
	return nil
}

// powerWithoutSign reads mm2 as mm^2.
func (t *table) powerWithoutSign(name string) []string {
	base, power := name[:len(name)-1], name[len(name)-1]
	if power < '2' || power > '9' {
		return nil
	}
	if t.atoms[base] != nil {
		return []string{base + "^" + string(power)}
	}
	if right := t.misspelled(base); len(right) == 1 && t.atoms[right[0]] != nil {
		return []string{right[0] + "^" + string(power)}
	}
	return nil
}

func singular(name string) string {
	if base, ok := strings.CutSuffix(name, "es"); ok && strings.HasSuffix(base, "ch") {
		return base
	}
	if base, ok := strings.CutSuffix(name, "s"); ok {
		return base
	}
	if base, ok := strings.CutSuffix(name, "S"); ok {
		return base
	}
	return name
}

// Misspelled reports whether a name that is no unit is a known slip for one, and gives the right
// spelling. That is "" where only the author can tell which of several units was meant, as with
// lb and ton; the error of Parse then lists them.
func Misspelled(name string) (fix string, ok bool) {
	if IsUnitName(name) || len(name) > maxName {
		return "", false
	}
	switch right := catalogue.misspelled(name); len(right) {
	case 0:
		return "", false
	case 1:
		return right[0], true
	}
	return "", true
}

// maxName is longer than any unit's name or known slip; longer names are not searched for.
const maxName = 32

// Suggest returns the known unit nearest to name, at most two letters away (one in a name of up
// to four), or "".
func Suggest(name string) string {
	if len(name) > maxName {
		return ""
	}
	return catalogue.nearest(name)
}

func (t *table) nearest(name string) string {
	letters := []rune(name)
	limit := 2
	switch {
	case len(letters) < 2:
		return ""
	case len(letters) < 5:
		limit = 1
	}
	best := ""
	for _, known := range t.names {
		if d := distance(letters, []rune(known), limit); d <= limit {
			best, limit = known, d-1
		}
	}
	return best
}

// distance counts the letters to change, add, leave out or swap with the next one to get from a to b.
// It gives limit+1 as soon as the lengths differ by more than limit.
func distance(a, b []rune, limit int) int {
	if len(a)-len(b) > limit || len(b)-len(a) > limit {
		return limit + 1
	}
	var before, last []int
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := range a {
		before, last, row = last, row, make([]int, len(b)+1)
		row[0] = i + 1
		for j := range b {
			change := 1
			if a[i] == b[j] {
				change = 0
			}
			row[j+1] = min(last[j+1]+1, row[j]+1, last[j]+change)
			if i > 0 && j > 0 && a[i] == b[j-1] && a[i-1] == b[j] {
				row[j+1] = min(row[j+1], before[j-1]+1)
			}
		}
	}
	return row[len(b)]
}

// alone are letters that stand for a unit where they are the whole of it; elsewhere a letter is
// rather a value's name.
var alone = map[string]string{"C": "degC", "F": "degF", "l": "L"}

// joinable keeps the forces and lengths of several spellings, since a hyphen joins nothing else:
// ft-lb can only mean lbf.
func (t *table) joinable(names []string) []string {
	var kept []string
	for _, n := range names {
		if a := t.atoms[n]; a != nil && (a.dim == dimForce || a.dim == dimLength) {
			kept = append(kept, n)
		}
	}
	if len(kept) == 0 {
		return names
	}
	return kept
}

// unknown answers a name that is no unit.
func (t *table) unknown(name string, start int, whole string) *ParseError {
	end := start + len(name)
	if len(name) > maxName {
		return fault("unknown-unit", start, end, "a name of %d bytes is no unit", len(name))
	}
	right := t.misspelled(name)
	if name == whole && alone[name] != "" {
		right = []string{alone[name]}
	}
	if strings.HasSuffix(whole[:start], "-") || strings.HasPrefix(whole[end:], "-") {
		right = t.joinable(right)
	}
	switch {
	case len(right) == 1:
		err := fault("wrong-unit-spelling", start, end, "`%s` is written `%s`", name, right[0])
		err.Fix = right[0]
		return err
	case len(right) > 1:
		err := fault("wrong-unit-spelling", start, end, "`%s` may be %s; write the one that is meant", name, alternatives(right))
		return err
	}
	if near := t.nearest(name); near != "" {
		return fault("unknown-unit", start, end, "`%s` is no unit; did you mean `%s`?", name, near)
	}
	return fault("unknown-unit", start, end, "`%s` is no unit", name)
}

// described says what a unit is where its name alone would not decide.
var described = map[string]string{
	"lbf": "force", "lbm": "mass", "oz": "mass", "ozf": "force", "t": "1,000 kg", "tf": "1,000 kgf", "tonf": "2,000 lbf",
}

func alternatives(names []string) string {
	var list []string
	for _, n := range names {
		text := "`" + n + "`"
		if d := described[n]; d != "" {
			text += " (" + d + ")"
		}
		list = append(list, text)
	}
	last := len(list) - 1
	return strings.Join(list[:last], ", ") + " or " + list[last]
}
