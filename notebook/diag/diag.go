// Package diag holds the one diagnostic type of the program, the sources that
// diagnostics point into, and their printing as text and as JSON. A diagnostic
// is data: the phase that finds a mistake says where it is, what was found and
// what to do; only the edge of the program turns it into lines on a terminal.
package diag

import (
	"sort"
)

// Severity orders diagnostics: an error stops the page, a warning and a note
// do not. Notes are counted and shown only on request.
type Severity int

// The severities, the gravest first.
const (
	Error Severity = iota
	Warning
	Note
)

func (s Severity) String() string {
	return [...]string{"error", "warning", "note"}[s]
}

// The stable ids a diagnostic may bear. They are part of the program's
// interface: other tools match on them.
const (
	Syntax               = "syntax"
	UnknownName          = "unknown-name"
	UnknownUnit          = "unknown-unit"
	Redefined            = "redefined"
	UsedBefore           = "used-before"
	DimensionMismatch    = "dimension-mismatch"
	NotANumber           = "not-a-number"
	MissingUnit          = "missing-unit"
	WrongUnitSpelling    = "wrong-unit-spelling"
	AmbiguousUnit        = "ambiguous-unit"
	OutOfRange           = "out-of-range"
	CarriedCycle         = "carried-cycle"
	MissingFile          = "missing-file"
	RowMismatch          = "row-mismatch"
	UnknownMark          = "unknown-mark"
	FrontMatter          = "front-matter"
	BareAngle            = "bare-angle"
	CarriedFailed        = "carried-failed"
	NoConvergence        = "no-convergence"
	BoundExceeded        = "bound-exceeded"
	UnsupportedCharacter = "unsupported-character"
	DroppedLink          = "dropped-link"
	Register             = "register"
	NotYet               = "not-yet"
	NoSource             = "no-source"
	UnusedValue          = "unused-value"
	Internal             = "internal"
)

// Span is a half-open range of byte offsets into a source's text.
type Span struct{ Start, End int }

// To returns the span from the start of s to the end of o.
func (s Span) To(o Span) Span { return Span{s.Start, o.End} }

// Diagnostic is one message about one place of one source. Message is the
// first line's text, lower case and without a full stop. Hints are the lines
// that follow the underlined source line: what to do, what is in scope.
type Diagnostic struct {
	Severity Severity
	ID       string
	Message  string
	Hints    []string
	Source   *Source // nil only where no file could be read at all
	Span     Span
}

// Sort orders diagnostics by source position within each source, sources in
// the order of their first appearance; equal places keep their order.
func Sort(list []Diagnostic) {
	rank := map[*Source]int{}
	for _, d := range list {
		if _, ok := rank[d.Source]; !ok {
			rank[d.Source] = len(rank)
		}
	}
	sort.SliceStable(list, func(i, j int) bool {
		a, b := list[i], list[j]
		if a.Source != b.Source {
			return rank[a.Source] < rank[b.Source]
		}
		return a.Span.Start < b.Span.Start
	})
}

// HasErrors tells whether any of the diagnostics is an error.
func HasErrors(list []Diagnostic) bool {
	for _, d := range list {
		if d.Severity == Error {
			return true
		}
	}
	return false
}
