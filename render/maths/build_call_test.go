package maths_test

import (
	"testing"
)

// A call within a reduction stands as the value that it gave for each row.
func TestCallsWithinReductions(t *testing.T) {
	half := "```\n\n```helper half\nx [length]\ny = x/2\ngives y\n```\n\n```calc\n"
	for _, c := range []struct{ line, put string }{
		{half + "e = max(half(bolts.y))", "max(37.50 mm, 37.50 mm, …, −38.00 mm)"},
		{half + "e = sum(half(steels.f_y*1 mm/(1 MPa)))", "117.5 mm + 177.5 mm"},
	} {
		if _, put := sides(t, c.line); put != c.put {
			t.Errorf("%s:\ngot  %s\nwant %s", c.line, put, c.put)
		}
	}
}
