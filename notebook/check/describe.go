package check

import (
	"errors"
	"fmt"

	"slices"
	"sort"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

func mustDim(unit string) units.Dimension {
	u := units.MustParse(unit)
	return u.Dim()
}

// describe says what a value is, in words and in the unit it would be printed
// in: "a force (kN)", "a plain number", "a temperature point (°C)".
func (c *checker) describe(t Type) string {
	switch t.Kind {
	case Text:
		return "a text"
	case Condition:
		return "a comparison"
	case Bundle:
		return "a helper with several results"
	case Point:
		return fmt.Sprintf("a temperature point (%s)", c.in.Printing.UnitFor(t.Dim, true).Pretty())
	}
	if t.Dim.IsNumber() {
		return "a plain number"
	}
	return fmt.Sprintf("%s (%s)", t.Dim.Article(), c.in.Printing.UnitFor(t.Dim, false).Pretty())
}

// unitWords says what a declared unit or quantity is: "MPa (stress)".
func (l *lower) unitWords(u *syntax.UnitRef) string {
	if u.Quantity != "" {
		return u.Quantity
	}
	if u.Point {
		return fmt.Sprintf("%s (a temperature point)", u.Text)
	}
	if u.Dim.IsNumber() {
		return fmt.Sprintf("%s (a plain number)", u.Text)
	}
	return fmt.Sprintf("%s (%s)", u.Text, u.Dim.Words())
}

func (c *checker) rowsName(r *Rows) string {
	if s := c.spaces[r.Name]; s != nil && s.rows == r {
		return r.Name
	}
	for _, key := range sortedKeys(c.spaces) {
		if c.spaces[key].rows == r {
			return key
		}
	}
	if name, ok := c.prog.CarriedRows[r]; ok {
		return name
	}
	return r.Name
}

// rowWords says how many entries a value has: "one value for each of bolts".
func (c *checker) rowWords(t Type) string {
	if len(t.Rows) == 0 {
		return "a plain value"
	}
	var names []string
	for _, r := range t.Rows {
		names = append(names, c.rowsName(r))
	}
	return "one value for each of " + list(names)
}

// list joins words: "a", "a and b", "a, b and c"; a long one is cut.
func list(words []string) string {
	const most = 8
	if len(words) > most {
		return strings.Join(words[:most], ", ") + fmt.Sprintf(" and %d more", len(words)-most)
	}
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	return strings.Join(words[:len(words)-1], ", ") + " and " + words[len(words)-1]
}

func resultNames(d *Def) []string {
	var out []string
	for _, r := range d.Results {
		out = append(out, r.ID)
	}
	return out
}

// mismatch reports that found has another dimension than want, and says by
// which known quantity it is off and which names in scope have that.
func (l *lower) mismatch(at diag.Span, message string, want, found Type) {
	l.fail(diag.DimensionMismatch, at, message, l.wayOut(want, found)...)
}

// everyName is the way out where a formula with `where` holds a dimension.
const everyName = "name every value that has a dimension behind `where`, with the unit that the rule assumes"

// asDifference says how a temperature point becomes the difference that is asked.
func (l *lower) asDifference(x syntax.Expr) string {
	if lit, ok := x.(*syntax.Number); ok && len(lit.Pieces) == 1 {
		unit := "K"
		if strings.HasSuffix(lit.Pieces[0].Unit.String(), "F") {
			unit = "degR"
		}
		return fmt.Sprintf("a difference is given in K or degR: write `%s %s`", strings.TrimSpace(strings.TrimSuffix(l.print(x), lit.Pieces[0].Unit.String())), unit)
	}
	return "a difference is given in K or degR; subtract a point from it"
}

// simple are the quantities by which a formula is most often off.
var simple = []struct{ name, unit string }{
	{"length", "m"}, {"area", "m^2"}, {"volume", "m^3"}, {"fourth power of a length", "m^4"}, {"force", "N"}, {"stress", "Pa"},
	{"moment", "N*m"}, {"line load", "N/m"}, {"time", "s"}, {"mass", "kg"}, {"acceleration", "m/s^2"}, {"speed", "m/s"}, {"temperature difference", "K"},
}

func (l *lower) wayOut(want, found Type) []string {
	var hints []string
	switch {
	case len(l.where) > 0 && want.Dim.IsNumber() != found.Dim.IsNumber():
		return []string{everyName}
	case want.Kind == Number && found.Kind == Number:
		hints = l.missingFactor(want.Dim, found.Dim)
	}
	for _, s := range l.spaced {
		hints = append(hints, "`"+s+"` divides or multiplies by the value, with blanks around the sign")
	}
	return hints
}

func (l *lower) missingFactor(want, found units.Dimension) []string {
	if want.IsNumber() || found.IsNumber() {
		dim, word := want, "a unit or a factor of that dimension is missing"
		if want.IsNumber() {
			dim, word = found, ""
		}
		if word == "" {
			return l.offer(fmt.Sprintf("divide it by %s for a plain number", dim.Article()), dim)
		}
		return l.offer(word, dim)
	}
	ratio, err := want.Div(found)
	if err != nil {
		return nil
	}
	for _, q := range simple {
		dim := mustDimCached(q.unit)
		if ratio == dim {
			return l.offer(article(q.name)+" is missing as a factor", dim)
		}
		if inverse, err := (units.Dimension{}).Div(dim); err == nil && ratio == inverse {
			return l.offer(article(q.name)+" is missing in the denominator", dim)
		}
	}
	return nil
}

var simpleDims = func() map[string]units.Dimension {
	m := map[string]units.Dimension{}
	for _, q := range simple {
		m[q.unit] = mustDim(q.unit)
	}
	return m
}()

func mustDimCached(unit string) units.Dimension { return simpleDims[unit] }

func article(word string) string {
	if strings.ContainsRune("aeiou", rune(word[0])) {
		return "an " + word
	}
	return "a " + word
}

// offer adds the names in scope that have a dimension to a hint.
func (l *lower) offer(words string, dim units.Dimension) []string {
	names := l.e.inScope(func(d *Def) bool { return d.Type.Kind == Number && d.Type.Dim == dim && !d.Failed })
	sort.SliceStable(names, func(i, j int) bool { return !strings.Contains(names[i], ".") && strings.Contains(names[j], ".") })
	if len(names) == 0 {
		return []string{words}
	}
	kind := dim.Name()
	if kind == "" {
		kind = "values of that dimension"
	} else if !strings.HasSuffix(kind, "s") {
		kind += "s"
	}
	if kind == "stresss" || strings.HasSuffix(kind, "ss") {
		kind += "es"
	}
	return []string{words + "; " + kind + " in scope: " + strings.Join(names[:min(len(names), 8)], ", ")}
}

// rowsError is a fault of the rows of a value.
type rowsError struct {
	id string
	error
}

func (l *lower) failRows(at diag.Span, err error) *Node {
	var r rowsError
	if errors.As(err, &r) {
		return l.fail(r.id, at, r.Error())
	}
	return l.fail(diag.RowMismatch, at, err.Error())
}

// The bounds on rows.
const (
	maxRows  = 100_000
	maxPairs = 10_000_000
)

// union is the rows of a value made from two: each set once, in the order the
// file defines them. Two different sets with a mark in common that come from
// different files are refused, so that they are never paired by accident.
func (c *checker) union(a, b []*Rows) ([]*Rows, error) {
	if len(b) == 0 || slices.Equal(a, b) {
		return a, nil
	}
	if len(a) == 0 {
		return b, nil
	}
	out := slices.Clone(a)
	for _, r := range b {
		if slices.Contains(out, r) {
			continue
		}
		for _, o := range a {
			if m, both := c.sharedMark(o, r); both {
				return nil, rowsError{diag.RowMismatch, fmt.Errorf("the rows %s (%s) and %s (%s) both have a mark `%s`, but are different sets from different files: they would be paired, each with each",
					c.rowsName(o), o.File, c.rowsName(r), r.File, m)}
			}
		}
		out = append(out, r)
	}
	n := 1
	for _, r := range out {
		if n *= max(r.N(), 1); n > maxPairs {
			return nil, rowsError{diag.BoundExceeded, fmt.Errorf("the rows of %s make over %d pairs, the bound", list(c.rowNames(out)), maxPairs)}
		}
	}
	sort.SliceStable(out, func(i, j int) bool { return c.order[out[i]] < c.order[out[j]] })
	return out, nil
}

func (c *checker) rowNames(rows []*Rows) []string {
	var names []string
	for _, r := range rows {
		names = append(names, c.rowsName(r))
	}
	return names
}

// sharedMark finds a mark that two sets from different files have in common.
func (c *checker) sharedMark(a, b *Rows) (string, bool) {
	if a.File == b.File || !a.Named || !b.Named {
		return "", false
	}
	key := [2]*Rows{a, b}
	if m, done := c.shared[key]; done {
		return m, m != ""
	}
	marks := make(map[string]bool, len(a.Marks))
	for _, m := range a.Marks {
		marks[m] = true
	}
	found := ""
	for _, m := range b.Marks {
		if marks[m] && m != "" {
			found = m
			break
		}
	}
	c.shared[key] = found
	return found, found != ""
}
