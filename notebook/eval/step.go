// Package eval computes a checked file: the typed tree to numbers. What it
// leaves behind are steps, complete in themselves, which everything that prints,
// lists or compares reads; nothing downstream evaluates again.
package eval

import (
	"gusset/notebook/check"
	"gusset/notebook/syntax"
	"gusset/units"
)

// Value is a computed value: one entry, or one for each combination of its
// rows, the first set of rows outermost. Numbers are in coherent SI units (a
// temperature point in K). An entry that does not exist (a helper's result
// without a value) is NaN.
type Value struct {
	Type check.Type
	Num  []float64
	Text []string // for texts
}

// Len is the number of entries.
func (v Value) Len() int {
	if v.Type.Kind == check.Text {
		return len(v.Text)
	}
	return len(v.Num)
}

// one is the plain value of an entry.
func (v Value) one(entry int) Value {
	out := Value{Type: v.Type}
	out.Type.Rows = nil
	if v.Type.Kind == check.Text {
		out.Text = v.Text[entry : entry+1]
	} else {
		out.Num = v.Num[entry : entry+1]
	}
	return out
}

// StepKind is what a step is.
type StepKind uint8

// The kinds of steps.
const (
	Given    StepKind = iota // a literal or a text, or a column of them
	Computed                 // the value of a formula
	Carried                  // a line that is only another file's value
	Check                    // a comparison with its verdict
	Function                 // the definition of a function of the author's own
	NoteLine                 // a line that is only a note
	Gap                      // space between groups of lines
	Limit                    // inside a helper: a limit of validity it was held to
	Constant                 // pi, g_n, a helper's argument: has a value, is not printed as a line
)

// Step is one printed thing: a statement with everything that was found out
// about it. Fields that do not apply to its kind are zero.
type Step struct {
	Kind StepKind
	Stmt syntax.Stmt // *syntax.Definition, *syntax.Check, … ; nil for columns, constants and arguments
	Line int         // in the file the statement stands in
	// Failed marks a statement that was not computed because of an error at
	// line Because; its value and check are void.
	Failed  bool
	Because int

	ID      string // the name in its English spelling, dots included; "" for checks
	Symbol  string // the name as its definition spells it
	Anchor  string // where it stands on the page, unique in the sheet
	Number  string // the equation number, "1.4"; "" for givens
	Note    string
	Source  string
	Brief   bool // in a `calc brief` block: no formula is printed
	Value   Value
	Unit    units.Unit // the unit it is printed in
	Figures int        // significant figures printed
	// Declared tells that the author declared the unit, Literal holds the
	// author's own figures of a given (nil for others and for columns).
	Declared bool
	Literal  *syntax.Number
	Negated  bool     // the literal stands behind a minus sign
	Cells    []string // a column's cells as the author wrote them, "" where printed from the value

	// Uses has what each name in the statement stands for, by its slot.
	Uses []*Step
	// Entry is the entry printed in full: the one that governs downstream, else
	// the largest in magnitude; 0 for a plain value.
	Entry int
	// Taken is the branch taken, for each entry; nil where there is one branch.
	Taken []int
	// Picks are the rows that `first of` picked from a schedule, for each entry.
	Picks []int
	// Trials are the candidates of `first of` that were tried for Entry, in order.
	Trials []Trial
	Check  *CheckResult
	// Calls are the helpers called in the statement, in source order, each as
	// run for Entry.
	Calls []*Call
	// Results are the results of a helper with several, named `jnt.F_v_Rk`.
	Results []*Step
	Origin  *Origin // where a carried value comes from
}

// Origin is the calc file a value was carried from.
type Origin struct {
	Key, Path, Calc, Rev, Title string
	Step                        *Step // the step of that file
}

// Name is the calc a value was carried from as it is cited: `C-104 rev B, Lifting lug`.
func (o *Origin) Name() string {
	name := o.Calc
	if o.Rev != "" {
		name += " rev " + o.Rev
	}
	if o.Title != "" {
		name += ", " + o.Title
	}
	return name
}

// Trial is one candidate of `first of`: the value as printed, its mark where it came from a
// schedule, and the comparison as it came out (`142.2 MPa > 136.6 MPa`).
type Trial struct {
	Value string
	Mark  string
	OK    bool
	Why   string
}

// Call is one call of a helper, or of a function of the author's own: its
// steps with the caller's values put in. A function has one step.
type Call struct {
	Expr     *syntax.Call
	Helper   *syntax.Helper // nil for a function of the author's own
	Library  bool           // ships with the program
	Args     []*Step        // the parameters in order, with the values they took
	Steps    []*Step        // Computed, NoteLine, Gap and Limit
	Results  []*Step        // those that `gives` names
	Cautions []string
	Mark     string        // the entry it was run for, "" for a plain call
	Rows     []*check.Rows // the sets that Entry counts in
	Entry    int
}

// CheckResult is how a check came out.
type CheckResult struct {
	Sides    []Side      // the operands of the comparison chain
	Ops      []syntax.Op // between them
	Type     check.Type  // the rows it runs over
	Required []bool      // for each entry
	OK       []bool      // for each entry; true where not required
	Ratio    []float64   // the utilisation of each entry, NaN where there is none
	Governs  int         // the entry with the verdict: the worst one
	Equal    bool        // the governing entry's sides are equal under < or >
	AllOK    bool
	IfOps    []syntax.Op // between the operands of NeededIf
	NeededIf []Side      // operands of the condition behind `if`, nil where there is none or it is no plain comparison
}

// Side is one operand of a comparison with its value and printed unit.
type Side struct {
	Expr    syntax.Expr
	Value   Value
	Unit    units.Unit
	Figures int
}

// Plot is what a plot block draws, recomputed over its range, in the axes' units.
type Plot struct {
	Title   string
	X, Y    Axis
	At      float64 // the swept value's present entry
	Present []Piece // the same as it is printed
	Curves  []Curve
	Limits  []Curve
	Checks  bool // bars of utilisation of the file's checks instead of curves
}

// Axis is one axis: the quantity's symbol and the unit it is drawn in.
type Axis struct {
	Symbol string
	Unit   units.Unit
}

// Curve is one line of a plot. Mark names the row it stands for where the
// value has rows beside the sweep; Of is how many of them there are, more than
// are drawn where there are too many for a curve each.
type Curve struct {
	ID, Symbol, Mark string
	Of               int
	X, Y             []float64
	Breaks           []int   // i where no line leads from point i to the next: it goes through infinity between them
	At               float64 // its present value
	Present          []Piece // the same as it is printed, in the axis' unit
}

// Figure is a sketch: its kind and the steps whose values it draws, in the
// order of the kind's parameters; nil where an optional one is absent.
type Figure struct {
	Kind  string
	Args  []*Step
	Names []string      // of the parameters
	Exprs []syntax.Expr // what the author gave for them
}
