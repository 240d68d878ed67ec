package units

import "strings"

// Quantity is a named kind of value, such as stress.
type Quantity struct {
	Name    string
	Dim     Dimension
	Aliases []string // other names for a value of this dimension
}

// quantityRow gives the exponents of length, mass, time, current, temperature, amount and
// luminous intensity. Where two rows have one dimension the first names it.
type quantityRow struct {
	name    string
	exp     [7]int16
	aliases string // comma-separated
	words   string // in messages, where the name would claim more than the dimension says
}

var quantityRows = []quantityRow{
	{name: "number", aliases: "plain number, angle, strain, ratio, factor"},
	{name: "length", exp: [7]int16{1}},
	{name: "area", exp: [7]int16{2}},
	{name: "volume", exp: [7]int16{3}, aliases: "section modulus, first moment of area"},
	{name: "second moment of area", exp: [7]int16{4}, aliases: "fourth power length, torsion constant, polar second moment of area"},
	{name: "warping constant", exp: [7]int16{6}},
	{name: "force", exp: [7]int16{1, 1, -2}, aliases: "load"},
	{name: "moment", exp: [7]int16{2, 1, -2}, aliases: "torque, bending moment, energy, work, rotational stiffness"},
	{name: "line load", exp: [7]int16{0, 1, -2}, aliases: "force per length, stiffness, shear flow", words: "force per length"},
	{name: "stress", exp: [7]int16{-1, 1, -2}, aliases: "pressure, modulus, modulus of elasticity, shear modulus, strength, area load"},
	{name: "bending stiffness", exp: [7]int16{3, 1, -2}, aliases: "flexural rigidity, torsional stiffness"},
	{name: "mass", exp: [7]int16{0, 1}},
	{name: "mass per length", exp: [7]int16{-1, 1}, aliases: "linear density"},
	{name: "mass per area", exp: [7]int16{-2, 1}, aliases: "area density"},
	{name: "density", exp: [7]int16{-3, 1}, aliases: "mass density"},
	{name: "weight density", exp: [7]int16{-2, 1, -2}, aliases: "unit weight, specific weight, subgrade modulus", words: "force per volume"},
	{name: "mass moment of inertia", exp: [7]int16{2, 1}},
	{name: "time", exp: [7]int16{0, 0, 1}},
	{name: "frequency", exp: [7]int16{0, 0, -1}, aliases: "angular frequency, angular speed, rotational speed"},
	{name: "speed", exp: [7]int16{1, 0, -1}, aliases: "velocity"},
	{name: "acceleration", exp: [7]int16{1, 0, -2}},
	{name: "power", exp: [7]int16{2, 1, -3}},
	{name: "flow rate", exp: [7]int16{3, 0, -1}, aliases: "volume flow"},
	{name: "mass flow", exp: [7]int16{0, 1, -1}},
	{name: "dynamic viscosity", exp: [7]int16{-1, 1, -1}},
	{name: "temperature difference", exp: [7]int16{0, 0, 0, 0, 1}},
	{name: "temperature", exp: [7]int16{0, 0, 0, 0, 1}},
	{name: "per temperature", exp: [7]int16{0, 0, 0, 0, -1}, aliases: "coefficient of thermal expansion, thermal expansion", words: "number per temperature"},
	{name: "electric current", exp: [7]int16{0, 0, 0, 1}},
	{name: "voltage", exp: [7]int16{2, 1, -3, -1}},
	{name: "electric resistance", exp: [7]int16{2, 1, -3, -2}},
	{name: "amount of substance", exp: [7]int16{0, 0, 0, 0, 0, 1}},
	{name: "luminous intensity", exp: [7]int16{0, 0, 0, 0, 0, 0, 1}},
}

func (r quantityRow) dim() Dimension {
	var d Dimension
	for i, n := range r.exp {
		d.exp[i].num = n
	}
	return d
}

func (r quantityRow) aliasList() []string {
	if r.aliases == "" {
		return nil
	}
	return strings.Split(r.aliases, ", ")
}

var (
	quantitiesByName = indexQuantities()
	quantitiesByDim  = indexDimensions()

	dimForce     = quantitiesByName["force"]
	dimLength    = quantitiesByName["length"]
	dimMoment    = quantitiesByName["moment"]
	dimFrequency = quantitiesByName["frequency"]
)

func indexQuantities() map[string]Dimension {
	index := map[string]Dimension{}
	for _, r := range quantityRows {
		for _, name := range append(r.aliasList(), r.name) {
			index[name] = r.dim()
		}
	}
	return index
}

func indexDimensions() map[Dimension]quantityRow {
	index := map[Dimension]quantityRow{}
	for _, r := range quantityRows {
		if _, ok := index[r.dim()]; !ok {
			index[r.dim()] = r
		}
	}
	return index
}

// Quantities lists the named quantities in the table's order.
func Quantities() []Quantity {
	list := make([]Quantity, len(quantityRows))
	for i, r := range quantityRows {
		list[i] = Quantity{r.name, r.dim(), r.aliasList()}
	}
	return list
}

var quantitySpelling = strings.NewReplacer("-", " ", "_", " ")

// QuantityByName returns the dimension of a named quantity. Words may be joined by a space, a
// hyphen or an underscore. "temperature" is a point: see QuantityPoint.
func QuantityByName(name string) (Dimension, bool) {
	d, ok := quantitiesByName[quantitySpelling.Replace(name)]
	return d, ok
}

// QuantityPoint reports whether the named quantity is a point on a scale, as "temperature" is.
func QuantityPoint(name string) bool { return name == "temperature" }

// Name returns the quantity's name, "number" for plain numbers, and "" for a dimension without one.
func (d Dimension) Name() string { return quantitiesByDim[d].name }
