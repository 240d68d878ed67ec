package check

import (
	"slices"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// Input is a calc file, parsed, with everything that its formulas may refer to
// outside itself. Nothing in it is changed.
type Input struct {
	Source   *diag.Source
	Blocks   []*syntax.Block   // in order
	Texts    []syntax.ValueRef // the values named in prose, in order
	Printing units.Printing
	Carried  []*Carry      // by the front matter's `from`, in order
	Helpers  []*HelperFile // by the front matter's `helpers`, in order
	Library  Library
	// ReadTable reads a CSV file that a schedule names: nil and the reason,
	// without a place, where it cannot be had.
	ReadTable func(path string) (*diag.Source, *diag.Diagnostic)
}

// Carry is another calc file's results under a key. Values holds the types
// of everything it defines by name; Failed tells that it has errors, so that it
// carries nothing.
type Carry struct {
	Key, Path string
	File      string // as diagnostics show it, see Rows
	Line      int    // of the calc, where the file is named
	Failed    bool
	Values    map[string]Type // `P_u`, `bolts.x`, `jnt.F_v_Rk`
	Rows      map[string]*Rows
	Order     []*Rows             // all sets that it has met, see Program
	Shared    map[string][]string // what the sets of a name that several bear are called in Rows
	Texts     map[string][]string // the entries of texts
	Picked    map[string]*Rows    // the schedule a `first of` picked a value from
}

// carriedRows names the sets of rows that come from other files: by the key of
// the file that made them where a calc carries from it, else by the first key
// that hands them on.
func carriedRows(carried []*Carry) map[*Rows]string {
	out := map[*Rows]string{}
	for _, own := range []bool{true, false} {
		for _, f := range carried {
			for name, r := range f.Rows {
				if _, named := out[r]; !named && (r.File == f.File || !own) {
					out[r] = f.Key + "." + name
				}
			}
		}
	}
	return out
}

// HelperFile is a file of the author's own helpers under a key. Failed tells
// that it could not be read, which has been reported.
type HelperFile struct {
	Key, Path string
	Line      int // of the calc, where the file is named
	Failed    bool
	Helpers   []*syntax.Helper
}

// Library is what ships with the program.
type Library struct {
	Names []string // of the helpers, sorted
	// Read returns the helper of one of the names. A calc calls few of them, so
	// that they are read when they are called.
	Read func(name string) *syntax.Helper
	// Natives are functions written in Go that only the library's own helpers
	// may call, where iteration, a series or an eigenvalue is required.
	Natives map[string]*Native
	// Tables are the shipped tables by path, `library/bolts_metric.csv`.
	Tables map[string]*diag.Source
}

// has tells that a helper of that name ships.
func (l *Library) has(name string) bool {
	_, ok := slices.BinarySearch(l.Names, name)
	return ok
}

// helper returns the helper of a name, nil where there is none.
func (l *Library) helper(name string) *syntax.Helper {
	if !l.has(name) {
		return nil
	}
	return l.Read(name)
}

// Native is a function in Go that library helpers call by position. F gets one
// slice for each argument (of length 1 but for columns), in coherent SI units; it returns
// NaN for a value that does not exist and an error where it does not converge.
type Native struct {
	Name   string
	Params []NativeParam
	Result units.Dimension
	F      func(args [][]float64) (float64, error)
}

// NativeParam is the dimension of one argument; Column tells that it takes a
// column of values.
type NativeParam struct {
	Dim    units.Dimension
	Column bool
}
