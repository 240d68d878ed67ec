package check

import (
	"slices"
	"sort"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// env is where names are looked up: the calc itself, the parameters of a
// function with the calc behind them, or the closed world of a helper's body.
type env struct {
	c       *checker
	src     *diag.Source
	scope   *Scope
	names   map[string]*Def
	funcs   map[string]*function
	helpers *helperSet
	above   int // how many of the helpers may be called: those that stand above
	parent  *env
	library bool // a library helper's body, which may call functions in Go
}

// closed tells that the names of the calc are out of reach: a helper sees its
// own parameters and lines only.
func (e *env) closed() bool {
	for e.parent != nil {
		e = e.parent
	}
	return e != e.c.top
}

// function is an author's function before it is used.
type function struct {
	def    *syntax.Definition
	env    *env
	line   int
	failed bool
	uses   map[string]*Function // instances by the types of the arguments
	// wrong holds where an instance was last found wrong: it is told once for each call
	// of the calc's own, and not looked into again by all that calls it there.
	wrong map[string]*diag.Span
}

// helper is a helper block with where it may be called from.
type helper struct {
	tree    *syntax.Helper
	library bool
	file    *helperSet // nil for one of the library
	place   int        // in its file
	failed  bool
	unread  bool // a line of it could not be read
	because int  // the line that it failed for
	line    int
}

// helperSet holds the helpers of one file in order.
type helperSet struct {
	order  []*helper
	trees  []*syntax.Helper // of a file of the author's own: all it holds, those not entered yet included
	byName map[string]*helper
}

func newHelperSet() *helperSet { return &helperSet{byName: map[string]*helper{}} }

func (s *helperSet) add(h *helper) {
	s.order = append(s.order, h)
	s.byName[h.tree.Name.ID] = h
}

// named returns a helper by its name, nil where there is none.
func (s *helperSet) named(id string) *helper {
	if s == nil {
		return nil
	}
	return s.byName[id]
}

func (e *env) lookup(id string) *Def {
	c := e.c
	for ; e != nil; e = e.parent {
		if d, ok := e.names[id]; ok {
			return d
		}
	}
	return c.consts[id]
}

func (e *env) function(id string) *function {
	for ; e != nil; e = e.parent {
		if f, ok := e.funcs[id]; ok {
			return f
		}
	}
	return nil
}

func (e *env) helper(id string) *helper {
	for ; e != nil; e = e.parent {
		if h := e.helpers.named(id); h != nil && h.place < e.above {
			return h
		}
	}
	return nil
}

// laterHelper is the line at which the helper file that a body stands in
// defines a helper, 0 where it does not.
func (e *env) laterHelper(id string) int {
	if e.helpers == nil {
		return 0
	}
	for _, tree := range e.helpers.trees {
		if tree.Name != nil && tree.Name.ID == id {
			return e.src.LineAt(tree.Name.At.Start)
		}
	}
	return 0
}

// define gives a name a place in the environment's scope.
func (e *env) define(n *syntax.Name, t Type) *Def {
	d := &Def{ID: n.ID, Symbol: n.Text, Slot: e.scope.newSlot(), Scope: e.scope, Type: t, At: n.At, Line: e.src.LineAt(n.At.Start)}
	e.names[n.ID] = d
	return d
}

// inScope lists the names in scope, sorted, that pass the test; names of
// schedules' columns and helpers' results included.
func (e *env) inScope(pass func(*Def) bool) []string {
	var out []string
	for c := e.c; e != nil; e = e.parent {
		if !c.looks.May(len(e.names)) {
			return nil
		}
		for id, d := range e.names {
			if pass(d) {
				out = append(out, id)
			}
		}
	}
	sort.Strings(out)
	return slices.Compact(out)
}

// constants are the names that are defined without the author.
func constants() map[string]*Def {
	out := map[string]*Def{}
	for _, k := range []struct {
		id, symbol, unit string
		value            float64
	}{
		{"pi", "π", "", pi},
		{"g_n", "g_n", "m/s^2", 9.80665},
	} {
		u, _ := units.Parse(k.unit)
		out[k.id] = &Def{ID: k.id, Symbol: k.symbol, Unit: &u, Type: Type{Kind: Number, Dim: u.Dim()}, Const: k.value, IsConst: true, used: true}
	}
	return out
}

const pi = 3.14159265358979323846264338327950288

// occupied tells what a top-level name already stands for, "" for nothing:
// values, functions, and the names before a dot share one namespace.
func (c *checker) occupied(id string) (what string, line int) {
	if d, ok := c.top.names[id]; ok {
		return "a value", d.Line
	}
	if c.consts[id] != nil {
		return "a constant", 0
	}
	if h := c.top.helpers.named(id); h != nil {
		return "a helper", h.line
	}
	if f, ok := c.top.funcs[id]; ok {
		return "a function", f.line
	}
	if s, ok := c.spaces[id]; ok {
		return s.what, s.line
	}
	return "", 0
}

// space is a name that stands before a dot.
type space struct {
	what    string
	line    int
	rows    *Rows
	because int // the line of a schedule of the name that could not be read, 0 for none
	from    *Carry
	file    *HelperFile
	helpers *helperSet
}

// head returns what stands before the first dot, and what follows it.
func head(id string) (string, string, bool) {
	return strings.Cut(id, ".")
}
