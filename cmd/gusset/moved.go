package main

import (
	"fmt"
	"strings"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// moved lists what differs between two compilations of a calc in what it
// prints: `tau 48.89 → 51.20 MPa`, `check (1.4) now NG`. Verdicts come first.
// Values are matched by name and checks by their text, the first of a text with
// the first.
func moved(old, now *notebook.Sheet) []string {
	before := printed(old)
	after := printed(now)
	var verdicts, list []string
	for _, e := range after.order {
		was, had := before.of[e]
		switch is := after.of[e]; {
		case !had && is.check:
			verdicts = append(verdicts, fmt.Sprintf("%s new, %s", is.label, is.text))
		case !had:
			list = append(list, fmt.Sprintf("%s new", is.label))
		case is.check && was.text != is.text:
			verdicts = append(verdicts, fmt.Sprintf("%s now %s", is.label, is.text))
		case was.text != is.text:
			list = append(list, is.label+" "+change(was.text, is.text))
		}
	}
	for _, e := range before.order {
		if _, has := after.of[e]; !has {
			list = append(list, fmt.Sprintf("%s gone", before.of[e].label))
		}
	}
	return append(verdicts, list...)
}

// entry tells one value or check of a calc from the others.
type entry struct {
	name  string // of a value, or the text of a check
	check bool
	nth   int // of the checks with one text
}

// item is what is printed of an entry.
type item struct {
	label string
	text  string // the value, or the verdict
	check bool
}

// items are the entries of a listing in order.
type items struct {
	order []entry
	of    map[entry]item
}

func printed(s *notebook.Sheet) items {
	list := items{of: map[entry]item{}}
	for _, l := range s.Listing() {
		e := entry{name: l.Name, check: l.Kind == notebook.CheckLine}
		if l.Kind == notebook.HeadingLine {
			continue
		}
		for _, taken := list.of[e]; taken; _, taken = list.of[e] {
			e.nth++
		}
		it := item{label: diag.Visible(l.Name), text: diag.Visible(l.Value), check: e.check}
		if it.check {
			it.label, it.text = fmt.Sprintf("check (%s)", l.Number), l.Verdict
		}
		list.order = append(list.order, e)
		list.of[e] = it
	}
	return list
}

// change writes two values with the unit once where they share it.
func change(was, is string) string {
	a, unitA, okA := strings.Cut(was, " ")
	_, unitB, okB := strings.Cut(is, " ")
	if okA && okB && unitA == unitB && !strings.Contains(unitA, " ") {
		return a + " → " + is
	}
	return was + " → " + is
}

// mostMoved is how many moves a line names: the rest is counted.
const mostMoved = 6

const nothingMoved = "no value moved"

// movedLine is one line of what moved.
func movedLine(list []string) string {
	if len(list) == 0 {
		return nothingMoved
	}
	if more := len(list) - mostMoved; more > 1 {
		list = append(list[:mostMoved:mostMoved], fmt.Sprintf("and %d more", more))
	}
	return strings.Join(list, ", ")
}
