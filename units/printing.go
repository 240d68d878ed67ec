package units

// System is the system of units printed where the author declares none.
type System int

// The two systems; the zero value is SI.
const (
	SI System = iota
	US
)

func (s System) String() string {
	if s == US {
		return "US"
	}
	return "SI"
}

// Printing says how the values of a calc file are printed. The zero value prints SI with four figures.
type Printing struct {
	System    System
	Preferred []Unit // each serves the dimension it has; of two the first
	Figures   int    // significant figures; 0 stands for 4
}

// defaults are the printed units of the two systems, one row for each dimension.
var defaults = [...][2]string{
	{"mm", "in"},
	{"mm^2", "in^2"},
	{"mm^3", "in^3"},
	{"mm^4", "in^4"},
	{"kN", "kip"},
	{"kN*m", "kip*ft"},
	{"kN/m", "kip/ft"},
	{"MPa", "ksi"},
	{"kg", "lbm"},
	{"kg/m^3", "lbm/ft^3"},
	{"kN/m^3", "lbf/ft^3"},
	{"s", "s"},
	{"Hz", "Hz"},
	{"m/s", "ft/s"},
	{"m/s^2", "ft/s^2"},
	{"kW", "hp"},
	{"K", "degR"},
	{"1/K", "1/degF"},
}

var (
	defaultUnits  = indexDefaults()
	defaultPoints = [2]Unit{MustParse("degC"), MustParse("degF")}
)

func indexDefaults() [2]map[Dimension]Unit {
	index := [2]map[Dimension]Unit{{}, {}}
	for _, row := range defaults {
		for system, text := range row {
			u := MustParse(text)
			index[system][u.Dim()] = u
		}
	}
	return index
}

// MustParse reads a unit that the program itself names, and panics where it is none.
func MustParse(text string) Unit {
	u, err := Parse(text)
	if err != nil {
		panic(err)
	}
	return u
}

// UnitFor returns the unit that values of a dimension are printed in where the line declares
// none: the preferred one, else the system's. point asks for a scale of temperature.
//
// Energy and moment share a dimension, so a preferred J serves neither: a moment never prints as J.
func (p Printing) UnitFor(d Dimension, point bool) Unit {
	for _, u := range p.Preferred {
		if u.Dim() == d && u.IsPoint() == point && (d != dimMoment || !u.hasJoule()) {
			return u
		}
	}
	system := SI
	if p.System == US {
		system = US
	}
	if point {
		return defaultPoints[system]
	}
	if u, ok := defaultUnits[system][d]; ok {
		return u
	}
	text := d.Base()
	if system == US {
		text = d.usBase()
	}
	if text == "" {
		return Unit{}
	}
	u, err := Parse(text)
	if err != nil { // lbf^60 has s^-120, out of bounds; a product of base units never is
		u, _ = Parse(d.Base())
	}
	return u
}

// usBase writes a dimension as a product of lbf, in, s and °R: 1 kg goes with 1 lbf*s^2/in.
func (d Dimension) usBase() string {
	force := d.exp[baseMass]
	forces, err := dimForce.Pow(int64(force.num), force.den())
	if err != nil {
		return d.Base()
	}
	rest, err := d.Div(forces)
	if err != nil {
		return d.Base()
	}
	rest.exp[baseMass] = force
	names := baseNames
	names[baseMass], names[baseLength], names[baseTemperature] = "lbf", "in", "degR"
	return product(rest, names)
}

func (u Unit) hasJoule() bool {
	for _, t := range u.get().terms {
		if t.atom != nil && t.atom.joule {
			return true
		}
	}
	return false
}
