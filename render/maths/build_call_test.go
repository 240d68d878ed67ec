package maths_test

import (
	"testing"

	"gusset/notebook/syntax"
	"gusset/render/maths"
)

// Literals count among what min and max choose from; names of `where` count in their units.
func TestLiteralsGovern(t *testing.T) {
	for _, c := range []struct{ line, governs string }{
		{"a = min(x, 2.5, n)", "2"},
		{"a = min(x, 1, n)", "1"},
		{"a = max(x, 2.5)", "2.5"},
		{"a = max(0, N)", "0"},
		{"a = min(t, 1 in)", "5"},
		{"a = max(t, 1 in)", "1"},
		{"a = max(T_2, 30 degF)", "30"},
		{"a [mm] = max(t, 0.003) where t [m]", "0.005000"},
		{"a [mm] = min(t, 0.003) where t [m]", "0.003"},
		{"a [mm] = min(t, 40) where t [mm]", "5"},
	} {
		s := last(t, c.line)
		d := s.Stmt.(*syntax.Definition)
		n := maths.NewBuilder().Put(d.Branches[0].Value, s, s.Value.Type, 0)
		if got := marked(n); got != c.governs {
			t.Errorf("%s: %q is marked, want %q", c.line, got, c.governs)
		}
	}
}

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
