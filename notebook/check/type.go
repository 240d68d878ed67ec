package check

import (
	"strings"

	"gusset/units"
)

// Kind is what sort of value an expression has.
type Kind uint8

// The kinds of values. Invalid marks what failed already, so that one mistake
// is one message.
const (
	Invalid Kind = iota
	Number
	Point // a temperature point
	Text
	Condition
	Bundle // the results of a helper that has several
)

// Rows is a set of rows that values run over: the rows of one schedule or of
// the load cases. Its identity is its pointer: it is what its defining block
// made it, whichever way it was carried.
type Rows struct {
	Name  string   // as the defining file calls it: `bolts`, `cases`
	Marks []string // one for each row; row numbers where the schedule has no column of marks
	File  string   // the file that defines it, as diagnostics show it
	Named bool     // the marks are the author's, no row numbers
	Swept bool     // the points of a plot: no rows to the author, so nothing reduces them
}

// Freq tells rotations per second from radians per second, which have one
// dimension and differ by 2π. Arithmetic drops it.
type Freq int8

// The ways a value of dimension 1/time may have been given or declared.
const (
	NoFreq  Freq = iota
	Hertz        // Hz or rpm
	Radians      // rad/s
)

// N is the number of rows.
func (r *Rows) N() int { return len(r.Marks) }

// Type is what is known of a value before it is computed.
type Type struct {
	Kind Kind
	Dim  units.Dimension
	Freq Freq    // how a frequency was written
	Rows []*Rows // the sets of rows it runs over, outermost first; none for a plain value
}

// Count is the number of entries of a value of this type.
func (t Type) Count() int {
	n := 1
	for _, r := range t.Rows {
		n *= r.N()
	}
	return n
}

// Mark names an entry by the marks of its rows (`LC3, B2`), "" for a plain value.
func (t Type) Mark(entry int) string {
	if len(t.Rows) == 0 {
		return ""
	}
	marks := make([]string, len(t.Rows))
	for i := len(t.Rows) - 1; i >= 0; i-- {
		n := t.Rows[i].N()
		marks[i] = t.Rows[i].Marks[entry%n]
		entry /= n
	}
	return strings.Join(marks, ", ")
}

// Project maps an entry of a value over rows to the entry of a value of type
// o, whose rows are some of t's. It is -1 where o has rows that t lacks.
func (t Type) Project(entry int, o Type) int {
	if len(o.Rows) == 0 {
		return 0
	}
	at := make(map[*Rows]int, len(t.Rows))
	for i := len(t.Rows) - 1; i >= 0; i-- {
		n := t.Rows[i].N()
		at[t.Rows[i]] = entry % n
		entry /= n
	}
	out := 0
	for _, r := range o.Rows {
		i, ok := at[r]
		if !ok {
			return -1
		}
		out = out*r.N() + i
	}
	return out
}
