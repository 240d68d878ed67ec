package render_test

import (
	"testing"

	"gusset/render"
)

// TestPicked prints of a library's table the rows that were looked up, and all
// of a table that is used in any other way.
func TestPicked(t *testing.T) {
	const head = "---\ncalc: T-1\n---\n\n```schedule timber from library/timber_en338.csv  # Classes\n```\n\n```calc\n"
	for _, test := range []struct {
		name, lines string
		want        []string // marks of the rows printed, nil for all
	}{
		{"a text", "rho = timber.rho_k at \"C24\"", []string{"C24"}},
		{"a given", "class = \"C30\"\nrho = timber.rho_k at class\nE = timber.E_0_mean at \"C24\"", []string{"C24", "C30"}},
		{"a reduction too", "rho = timber.rho_k at \"C24\"\nmost = max(timber.rho_k)", nil},
		{"in text too", "rho = timber.rho_k at \"C24\"\n```\n\nDensities are {timber.rho_k}.\n\n```calc\na = 1", nil},
		{"not used", "a = 1", nil},
	} {
		page := render.NewPage(compile(t, head+test.lines+"\n```\n"))
		table := page.Blocks[0][0].Tables[0]
		if test.want == nil {
			if table.Printed != nil {
				t.Errorf("%s: %d rows printed, want all", test.name, len(table.Printed))
			}
			continue
		}
		var got []string
		for _, row := range table.Printed {
			got = append(got, string(table.AppendCell(nil, row, 0)))
		}
		if len(got) != len(test.want) {
			t.Errorf("%s: rows %q, want %q", test.name, got, test.want)
			continue
		}
		for i := range got {
			if got[i] != test.want[i] {
				t.Errorf("%s: rows %q, want %q", test.name, got, test.want)
			}
		}
	}
}
