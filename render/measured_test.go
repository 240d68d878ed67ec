package render

import "testing"

// TestMeasured tells a unit behind a number from a word.
func TestMeasured(t *testing.T) {
	for _, test := range []struct {
		before, after string
		want          bool
	}{
		{"a clearance of 1", "mm lets it go in", true},
		{"3/4", "in, in one line", true},
		{"5", "% of the pull", true},
		{"12", "kN/m)", true},
		{"of the 4", "bolts", false},
		{"Table", "mm", false},
		{"", "mm", false},
		{"7", "", false},
	} {
		if got := Measured(test.before, test.after); got != test.want {
			t.Errorf("%q, %q: got %v", test.before, test.after, got)
		}
	}
}
