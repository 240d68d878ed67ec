// Package units knows dimensions, units of measurement and how an engineer writes and prints them.
//
//	kN, _ := units.Parse("kN")
//	mm2, _ := units.Parse("mm^2")
//	stress, _ := kN.Dim().Div(mm2.Dim())
//	stress.Name()                                    // "stress"
//	units.Printing{}.UnitFor(stress, false).String() // "MPa"
//	mm2.ToSI(25)                                     // 2.5e-05
//
// A [Dimension] is seven exact rational exponents, so that equality is exact and MPa*m^(1/2) is a
// unit like any other. A [Unit] is a parsed expression over the names of one table
// (catalogue.go), in which every unit is defined by exact rationals, and angles by rational
// multiples of π. Values are held in coherent SI; ToSI and FromSI round once.
//
// Angles are plain numbers (1 rad = 1), a frequency of 1 rpm is 1/60 Hz, and the degrees Celsius and
// Fahrenheit are points of temperature alone and differences inside a compound. Torque and energy
// share a dimension; the package calls it a moment.
package units
