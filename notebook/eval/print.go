package eval

import (
	"math"
	"strings"

	"gusset/notebook/check"
	"gusset/units"
)

// Piece is one number as it is printed, with its unit: a compound of feet and inches has two.
// Figures are in ASCII ("-6.036e-4", "1 1/4"); Text is set for a text value instead.
type Piece struct {
	Figures string
	Unit    units.Unit
	Text    string
}

// Printed returns what pages print for an entry of the step's value: the
// author's own figures for a given, else the value in the step's unit. It is
// empty for an entry that does not exist.
func (s *Step) Printed(entry int) []Piece {
	if s.Literal != nil {
		return printLiteral(s)
	}
	if entry < len(s.Cells) && s.Cells[entry] != "" {
		return []Piece{{Figures: s.Cells[entry], Unit: s.Unit}}
	}
	return s.Value.Printed(entry, s.Unit, s.Figures)
}

func printLiteral(s *Step) []Piece {
	pieces := make([]Piece, len(s.Literal.Pieces))
	for i, p := range s.Literal.Pieces {
		pieces[i] = Piece{Figures: strings.ReplaceAll(p.Figures, "_", ""), Unit: p.Unit}
	}
	if s.Literal.Neg || s.Negated {
		pieces[0].Figures = "-" + pieces[0].Figures
	}
	return pieces
}

// Printed returns an entry of the value as printed in a unit.
func (v Value) Printed(entry int, u units.Unit, figures int) []Piece {
	if v.Type.Kind == check.Text {
		return []Piece{{Text: v.Text[entry]}}
	}
	if entry >= len(v.Num) || math.IsNaN(v.Num[entry]) {
		return nil
	}
	return []Piece{{Figures: units.Format(u.FromSI(v.Num[entry]), figures), Unit: u}}
}

// PlainText joins pieces as JSON's `text` has them: ASCII minus, plain spaces, the
// unit in the page's spelling; "–" for an entry that does not exist.
func PlainText(pieces []Piece) string {
	if len(pieces) == 0 {
		return "–"
	}
	var b strings.Builder
	for i, p := range pieces {
		if i > 0 {
			b.WriteByte(' ')
		}
		if p.Text != "" || p.Figures == "" {
			b.WriteString(p.Text)
			continue
		}
		b.WriteString(p.Figures)
		switch u := p.Unit.Pretty(); u {
		case "":
		case "°", "′", "″":
			b.WriteString(u)
		default:
			b.WriteByte(' ')
			b.WriteString(u)
		}
	}
	return b.String()
}
