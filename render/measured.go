package render

import (
	"strings"

	"gusset/units"
)

// Measured tells whether the blank between two pieces of prose stands between
// a number and its unit, where no line should break.
func Measured(before, after string) bool {
	if n := len(before); n == 0 || before[n-1] < '0' || before[n-1] > '9' {
		return false
	}
	if i := strings.IndexAny(after, " \n\t"); i >= 0 {
		after = after[:i]
	}
	after = strings.TrimRight(after, ".,;:!?)]")
	if after == "" || len(after) > longestUnit {
		return false
	}
	_, err := units.Parse(after)
	return err == nil
}

// longestUnit bounds what is tried as a unit, in bytes.
const longestUnit = 24
