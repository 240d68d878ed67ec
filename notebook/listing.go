package notebook

import (
	"slices"

	"github.com/yuin/goldmark/ast"

	"gusset/notebook/eval"
)

// LineKind is what a line of the listing is.
type LineKind int

// The kinds of lines.
const (
	HeadingLine LineKind = iota
	ValueLine
	CheckLine
)

// Line is one line of a calc's listing in a terminal.
type Line struct {
	Kind        LineKind
	Number      string // of the heading or the equation
	Name        string // the heading's text, the value's name, the check's text
	Value       string // `48.89 MPa`; over rows the range and the entry that governs
	Utilisation string // of a check, "" where there is none
	Verdict     string // "OK", "NG", "not required", "not computed"
	Because     int    // of a line not computed, the line with the error
	Governs     string // the mark of the entry that decides a check over rows
	Note        string
	Source      string
	Step        *Step // the value or the check, nil for a heading
}

// Listing returns the calc's headings, values and checks in order.
func (s *Sheet) Listing() []Line {
	var lines []Line
	for n := range nodes(s.Doc) {
		switch n := n.(type) {
		case *ast.Heading:
			if h := s.byHeading[n]; h != nil {
				lines = append(lines, Line{Kind: HeadingLine, Number: h.Number, Name: h.Text})
			}
		case *FenceNode:
			if n.Index < len(s.Blocks) {
				for _, step := range s.Blocks[n.Index].Steps {
					lines = s.list(lines, step)
				}
			}
		}
	}
	return lines
}

func (s *Sheet) list(lines []Line, step *Step) []Line {
	line := Line{Kind: ValueLine, Number: step.Number, Name: step.Symbol, Note: step.Note, Source: step.Source, Step: step}
	switch step.Kind {
	case eval.Check:
		line.Kind, line.Name = CheckLine, s.checkText(step)
	case eval.Given, eval.Computed, eval.Carried:
	default:
		return lines
	}
	if step.Origin != nil && line.Source == "" {
		line.Source = step.Origin.Name()
	}
	switch c := step.Check; {
	case step.Failed:
		line.Verdict, line.Because = "not computed", step.Because
	case c != nil:
		line.Verdict, line.Governs = "NG", c.Type.Mark(c.Governs)
		line.Utilisation = eval.UtilisationText(c.Ratio[c.Governs], c.OK[c.Governs], c.Equal)
		if c.AllOK {
			line.Verdict = "OK"
		}
		if !slices.Contains(c.Required, true) {
			line.Verdict, line.Utilisation, line.Governs = "not required", "", ""
		}
	case len(step.Results) > 0:
		for i, r := range step.Results {
			part := Line{Kind: ValueLine, Name: r.Symbol, Value: valueText(r), Note: r.Note, Source: r.Source, Step: r}
			if i == 0 {
				part.Number, part.Note, part.Source = step.Number, step.Note, line.Source
			}
			lines = append(lines, part)
		}
		return lines
	default:
		line.Value = valueText(step)
	}
	return append(lines, line)
}

// valueText is a value as a sentence prints it.
func valueText(step *Step) string {
	return newRef(eval.RefResult{Step: step, Unit: step.Unit}, false).Text
}
