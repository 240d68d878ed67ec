package main

import (
	"fmt"
	"strings"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
)

// moved lists what differs between two compilations of a calc in what it
// prints: `tau 48.89 → 51.20 MPa`, `check (1.4) now NG`. Verdicts come first.
// Values are matched by name and checks by their text, the first of a text with
// the first, and then by their number.
func moved(old, now *notebook.Sheet) []string {
	before := printed(old)
	after := printed(now)
	gone := map[string]item{}
	for _, e := range before.order {
		if _, has := after.of[e]; !has {
			gone[before.of[e].label] = before.of[e]
		}
	}
	var verdicts, list []string
	for _, e := range after.order {
		was, had := before.of[e]
		is := after.of[e]
		if had {
			if is.check && was.text != is.text {
				verdicts = append(verdicts, fmt.Sprintf("%s now %s", is.label, is.text))
			} else if how := is.change(was); !is.check && how != "" {
				list = append(list, is.label+how)
			}
			continue
		}
		was, rewritten := gone[is.label]
		switch {
		case !is.check:
			list = append(list, is.label+" new")
		case !rewritten || !was.check:
			verdicts = append(verdicts, fmt.Sprintf("%s new, %s", is.label, is.text))
		default:
			delete(gone, is.label)
			still := "now"
			if was.text == is.text {
				still = "still"
			}
			verdicts = append(verdicts, fmt.Sprintf("%s rewritten, %s %s", is.label, still, is.text))
		}
	}
	for _, e := range before.order {
		label := before.of[e].label
		if _, yes := gone[label]; yes {
			delete(gone, label)
			list = append(list, label+" gone")
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
	step  *notebook.Step
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
		it := item{label: diag.Visible(l.Name), text: diag.Visible(l.Value), check: e.check, step: l.Step}
		if it.check {
			it.label, it.text = fmt.Sprintf("check (%s)", l.Number), l.Verdict
		}
		list.order = append(list.order, e)
		list.of[e] = it
	}
	return list
}

// change says how a value differs from what it was, "" where it does not. Over
// rows the text is the range, within which entries may move unseen.
func (is item) change(was item) string {
	if was.text != is.text {
		return " " + change(was.text, is.text)
	}
	if was.step == nil || is.step == nil || len(is.step.Value.Type.Rows) == 0 {
		return ""
	}
	before, after := was.step.Value.Len(), is.step.Value.Len()
	if before != after {
		return fmt.Sprintf(" %d → %d entries", before, after)
	}
	first, more := "", 0
	for i := range after {
		a, b := entryText(was.step, i), entryText(is.step, i)
		switch {
		case a == b:
		case first == "":
			first = " " + change(a, b)
			if mark := is.step.Value.Type.Mark(i); mark != "" {
				first = " at " + diag.Visible(mark) + first
			}
		default:
			more++
		}
	}
	if more > 0 {
		first += fmt.Sprintf(" and %d more", more)
	}
	return first
}

func entryText(s *notebook.Step, i int) string { return diag.Visible(eval.PlainText(s.Printed(i))) }

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
