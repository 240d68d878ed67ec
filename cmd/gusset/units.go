package main

import (
	"errors"
	"fmt"
	"io"
	"math/big"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

func unitsCommand(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "units [VALUE UNIT]",
		Short: "List the units, or convert a value and show the exact factor",
		Long: `units lists every unit by the quantity that it measures, with its definition and the
prefixes it takes. With a value and a unit it converts the one into the other. A value is
written as in a calc file, and quoted for the shell.`,
		Example: "  gusset units '48 kip' kN\n  gusset units '12 ft 6 in' m\n  gusset units '20 degC' degF\n  gusset units",
		Args: func(cmd *cobra.Command, args []string) error {
			if n := len(args); n > 2 {
				return fmt.Errorf("quote the value, so that it is one word to the shell: `gusset units '%s' %s`", strings.Join(args[:n-1], " "), args[n-1])
			}
			if len(args) == 1 {
				return errors.New("a value is converted to a unit, as in `gusset units '48 kip' kN`; `gusset units` alone lists them all")
			}
			return nil
		},
		RunE: func(_ *cobra.Command, args []string) error {
			if len(args) == 0 {
				_, err := io.WriteString(t.out, unitsList(t.colour))
				return err
			}
			text, err := convert(args[0], args[1])
			if err == nil {
				_, err = io.WriteString(t.out, text)
			}
			return err
		},
	}
}

// unitsList is every unit under its quantity.
func unitsList(colour style) string {
	var name, definition column
	list := units.Catalogue()
	for _, e := range list {
		name.fit(unitNames(e), leftWidth)
		definition.fit(unitDefinition(e), leftWidth)
	}
	var b strings.Builder
	quantity := ""
	for _, e := range list {
		if e.Quantity != quantity {
			if quantity != "" {
				b.WriteByte('\n')
			}
			quantity = e.Quantity
			b.WriteString(colour.paint(bold, quantity) + "\n")
		}
		line := "   " + name.pad(unitNames(e)) + "  " + definition.pad(unitDefinition(e))
		if len(e.Prefixes) > 0 {
			line += "  prefixes " + strings.Join(e.Prefixes, " ")
		}
		b.WriteString(strings.TrimRight(line, " ") + "\n")
	}
	return b.String()
}

func unitNames(e units.Entry) string {
	return strings.Join(append([]string{e.Name}, e.Aliases...), ", ")
}

func unitDefinition(e units.Entry) string {
	if e.Definition == "base unit" {
		return e.Definition
	}
	return "= " + e.Definition
}

// convert turns a value, as a calc file writes it, into another unit and shows
// the exact factor.
func convert(value, unit string) (string, error) {
	x, from, err := readValue(value)
	if err != nil {
		return "", err
	}
	to, err := units.Parse(strings.TrimSpace(unit))
	if err != nil {
		return "", err
	}
	if (from.IsPoint() || to.IsPoint()) && from.Dim() == to.Dim() && from.LiteralToSI(x) < -1e-9 {
		return "", fmt.Errorf("`%s` lies below absolute zero", strings.TrimSpace(value))
	}
	if from.IsPoint() != to.IsPoint() && from.Dim() == to.Dim() {
		return convertPoint(value, x, from, to)
	}
	if from.CountsTurns() && to.IsAngular() || from.IsAngular() && to.CountsTurns() {
		return "", fmt.Errorf("`%s` counts %s and `%s` %s: they differ by the factor 2π", from, turns(from), to, turns(to))
	}
	y, exact, err := units.Convert(x, from, to)
	if err != nil {
		return "", err
	}
	return fmt.Sprintf("%s = %s\n   %s\n", strings.TrimSpace(value), withUnit(y, to), exact), nil
}

// turns says what a unit of frequency or of angular speed counts.
func turns(u units.Unit) string {
	if u.IsAngular() {
		return "radians"
	}
	return "turns"
}

// convertPoint converts between a scale of temperature and K or degR, which
// count from absolute zero where they stand for a point. They also measure
// differences, so the message says which was taken.
func convertPoint(value string, x *big.Rat, from, to units.Unit) (string, error) {
	value = strings.TrimSpace(value)
	y := withUnit(to.FromSI(from.LiteralToSI(x)), to)
	if from.IsPoint() {
		return fmt.Sprintf("%s = %s above absolute zero\n   `%s` is a point of temperature, so `%s` was counted from absolute zero; a difference is written in K or degR\n",
			value, y, from, to), nil
	}
	text := fmt.Sprintf("%s above absolute zero = %s\n   `%s` is a point of temperature, so `%s` was counted from absolute zero", value, y, to, from)
	difference, err := units.Parse(differences[to.String()])
	if err != nil {
		return "", err
	}
	if d, _, err := units.Convert(x, from, difference); err == nil {
		text += fmt.Sprintf("; as a difference it is %s", withUnit(d, difference))
	}
	return text + "\n", nil
}

// differences are the units of a difference on each scale of temperature.
var differences = map[string]string{"degC": "K", "°C": "K", "degF": "degR", "°F": "degR"}

// readValue reads one number with its unit, compounds like `12 ft 6 in` and a
// sign included. The number is exact and in the unit of its first part.
func readValue(value string) (*big.Rat, units.Unit, error) {
	src := diag.NewSource("value", []byte(value))
	e, diags := syntax.ParseExpr(src, diag.Span{End: len(src.Text)})
	for _, d := range diags {
		if d.Severity == diag.Error {
			return nil, units.Unit{}, errors.New(strings.Join(append([]string{d.Message}, d.Hints...), "\n"))
		}
	}
	negative := false
	if sign, ok := e.(*syntax.Unary); ok && sign.Op == syntax.Neg {
		negative, e = true, sign.X
	}
	n, ok := e.(*syntax.Number)
	if !ok {
		return nil, units.Unit{}, fmt.Errorf("`%s` is no value: a value is one number with its unit, as in `48 kip`", value)
	}
	unit := n.Pieces[0].Unit
	sum := new(big.Rat)
	for _, piece := range n.Pieces {
		x, err := piece.Rat()
		if err != nil {
			return nil, unit, fmt.Errorf("`%s`: %w", value, err)
		}
		sum.Add(sum, x.Mul(x, ratio(piece.Unit, unit)))
	}
	if negative != n.Neg {
		sum.Neg(sum)
	}
	return sum, unit, nil
}

// ratio is how many of the second unit the first is, both of one dimension. The
// parts of a compound are, so that powers of π cancel.
func ratio(u, of units.Unit) *big.Rat {
	a, _, _ := u.Exact()
	b, _, _ := of.Exact()
	return a.Quo(a, b)
}

// withUnit prints a number with as many figures as a float64 holds for sure.
func withUnit(x float64, u units.Unit) string {
	return strings.TrimRight(strconv.FormatFloat(x, 'g', 15, 64)+" "+u.String(), " ")
}
