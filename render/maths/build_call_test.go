package maths_test

import (
	"testing"
)

// A call within a reduction stands as the value that it gave for each row, and
// one that gives rows as that of the row written out.
func TestCallsWithinReductions(t *testing.T) {
	half := "```\n\n```helper half\nx [length]\ny = x/2\ngives y\n```\n\n```calc\n"
	twice := "```\n\n```helper twice\nx [column of length]\ny = 2*x\ngives y\n```\n\n```calc\n"
	for _, c := range []struct{ line, put string }{
		{"e = 2*interpolate(steels.f_y, steels.f_y*2, steels.f_y) + steels.f_y", "2·interpolate(f_y_steels, f_y_steels·2, 355 MPa) + 355 MPa"},
		{twice + "e = 3*twice(bolts.y) + bolts.x", "3·150.0 mm + 70 mm"},
		{twice + "e = 3*twice(bolts.x - 10 mm) - bolts.y", "3·(−160.0 mm) − 75 mm"},
		{twice + "e = max(twice(bolts.y))", "max(150.0 mm, 150.0 mm, …, −152.0 mm)"},
		{half + "e = max(half(bolts.y))", "max(37.50 mm, 37.50 mm, …, −38.00 mm)"},
		{half + "e = sum(half(steels.f_y*1 mm/(1 MPa)))", "117.5 mm + 177.5 mm"},
	} {
		if _, put := sides(t, c.line); put != c.put {
			t.Errorf("%s:\ngot  %s\nwant %s", c.line, put, c.put)
		}
	}
}
