package main

import (
	"fmt"
	"strings"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// leftWidth bounds the column of names and values: one long line does not push
// all the notes aside.
const leftWidth = 46

// listing is a calc in a terminal: a line for each heading, value and check.
func listing(s *notebook.Sheet, colour style) string {
	lines := s.Listing()
	var b strings.Builder
	b.WriteString(colour.paint(bold, title(s)) + "\n")
	var names, left, verdicts column
	for _, l := range lines {
		if l.Kind == notebook.ValueLine {
			names.fit(diag.Visible(l.Name), leftWidth/2)
		}
	}
	for _, l := range lines {
		if l.Kind != notebook.HeadingLine {
			left.fit(leftCell(l, names), leftWidth)
			verdicts.fit(l.Utilisation, leftWidth)
		}
	}
	count := map[string]int{}
	for _, l := range lines {
		switch l.Kind {
		case notebook.HeadingLine:
			b.WriteString("\n" + colour.paint(bold, strings.TrimSpace(l.Number+" "+diag.Visible(l.Name))) + "\n")
			continue
		case notebook.CheckLine:
			count[l.Verdict]++
		}
		b.WriteString(strings.TrimRight(bodyLine(l, names, left, verdicts, colour), " ") + "\n")
	}
	if line := checksLine(count); line != "" {
		b.WriteString("\n" + line + "\n")
	}
	return b.String()
}

// title is the number, the revision and the title of a calc, or its file's name
// where it has none.
func title(s *notebook.Sheet) string {
	f := &s.Front
	text := f.Calc
	if text == "" {
		text = s.Source.Name
	}
	if f.Rev != "" {
		text += " rev " + f.Rev
	}
	if f.Title != "" {
		text += "  " + f.Title
	}
	return diag.Visible(text)
}

// column is the width of a column: the widest cell within a bound.
type column int

func (c *column) fit(cell string, bound int) {
	if w := diag.Width(cell); w <= bound {
		*c = max(*c, column(w))
	}
}

// pad fills a cell to the column's width.
func (c column) pad(cell string) string {
	return cell + strings.Repeat(" ", max(int(c)-diag.Width(cell), 0))
}

func leftCell(l notebook.Line, names column) string {
	name := diag.Visible(l.Name)
	if l.Kind == notebook.CheckLine {
		return "check " + name
	}
	value := diag.Visible(l.Value)
	if l.Verdict != "" {
		value = notComputed(l)
	}
	return names.pad(name) + " = " + value
}

// notComputed says which line is at fault.
func notComputed(l notebook.Line) string {
	return fmt.Sprintf("%s, see line %d", l.Verdict, l.Because)
}

func bodyLine(l notebook.Line, names, left, verdicts column, colour style) string {
	number := ""
	if l.Number != "" {
		number = "(" + l.Number + ")"
	}
	text := fmt.Sprintf("%8s  %s  ", number, left.pad(leftCell(l, names)))
	if l.Kind == notebook.CheckLine {
		verdict := l.Verdict
		switch verdict {
		case "OK":
			verdict = colour.paint(green, verdict)
		case "NG":
			verdict = colour.paint(red, verdict)
		case "not computed":
			verdict = notComputed(l)
		}
		if l.Utilisation != "" {
			verdict = l.Utilisation + strings.Repeat(" ", max(int(verdicts)-diag.Width(l.Utilisation), 0)) + " " + verdict
		}
		text += verdict + "  "
		if l.Governs != "" {
			text += diag.Visible(l.Governs) + " governs  "
		}
	}
	text += diag.Visible(l.Note)
	if l.Source != "" {
		text = strings.TrimRight(text, " ")
		if l.Note == "" {
			text += " "
		}
		text += " " + colour.paint(faint, "["+diag.Visible(l.Source)+"]")
	}
	return text
}

// checksLine sums the checks up: `5 checks: 3 OK, 1 NG, 1 not required`, or
// `5 checks, all OK`.
func checksLine(count map[string]int) string {
	total := 0
	var parts []string
	for _, verdict := range []string{"OK", "NG", "not required", "not computed"} {
		if n := count[verdict]; n > 0 {
			total += n
			parts = append(parts, fmt.Sprintf("%d %s", n, verdict))
		}
	}
	switch {
	case total == 0:
		return ""
	case total == 1:
		return "1 check, " + strings.TrimPrefix(parts[0], "1 ")
	case len(parts) == 1:
		return plural(total, "check") + ", all " + strings.TrimPrefix(parts[0], fmt.Sprint(total, " "))
	}
	return plural(total, "check") + ": " + strings.Join(parts, ", ")
}
