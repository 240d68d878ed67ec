package html

import (
	"strconv"
	"strings"

	"gusset/render/maths"
	"gusset/units"
)

// value writes a printed value as text in the face of its surroundings: the
// true minus, powers as superscripts, and a space that does not break before
// the unit; the style sheet makes it thin.
func (w *writer) value(n maths.Node) {
	switch n := n.(type) {
	case maths.Row:
		for _, c := range n {
			w.value(c)
		}
	case maths.Space:
		w.raw("\u00a0")
	case maths.Number:
		open := w.link(n.Ref)
		w.number(n)
		w.close(open)
	case maths.Text:
		open := w.link(n.Ref)
		w.text(n.Text)
		w.close(open)
	case maths.Script:
		w.value(n.Base)
		if t, ok := n.Sup.(maths.Text); ok {
			w.raw("<sup>")
			w.text(t.Text)
			w.raw("</sup>")
		}
	}
}

func (w *writer) link(r maths.Ref) bool {
	if r.Target == "" {
		return false
	}
	w.raw(`<a class="v" href="#`)
	w.text(r.Target)
	if r.Tip != "" {
		w.raw(`" data-tip="`)
		w.text(r.Tip)
	}
	w.raw(`">`)
	return true
}

func (w *writer) close(open bool) {
	if open {
		w.raw("</a>")
	}
}

func (w *writer) number(n maths.Number) {
	mantissa, power := units.SplitExponent(n.Value)
	if rest, negative := strings.CutPrefix(mantissa, "-"); negative {
		w.raw("−")
		mantissa = rest
	}
	w.text(mantissa)
	if power != "" {
		w.raw("\u202f×\u202f10<sup>")
		if rest, negative := strings.CutPrefix(power, "-"); negative {
			w.raw("−")
			power = rest
		}
		w.text(power)
		w.raw("</sup>")
	}
	if len(n.Unit) == 0 {
		return
	}
	if gap := n.Gap(); gap > 0 {
		w.raw("\u00a0")
		if gap > maths.Thin {
			w.raw("\u202f")
		}
		if power != "" || len(n.Unit) > 2 { // the longest values part here in the output column, not within the unit
			w.raw("<wbr>")
		}
	}
	w.unit(n.Unit)
}

// unit writes a unit as text.
func (w *writer) unit(u maths.Unit) {
	for _, t := range u {
		w.raw(t.Sep)
		if t.Open {
			w.raw("(")
		}
		w.text(t.Name)
		if t.Num != 1 || t.Den > 1 {
			w.exponent(t.Num, t.Den)
		}
		if t.Close {
			w.raw(")")
		}
	}
}

// exponent writes the exponent of a unit: a superscript character for a small
// whole one, which can be searched for and copied.
func (w *writer) exponent(num, den int) {
	if den <= 1 && num >= 2 && num <= 9 {
		w.raw([]string{"²", "³", "⁴", "⁵", "⁶", "⁷", "⁸", "⁹"}[num-2])
		return
	}
	w.raw("<sup>")
	if num < 0 {
		w.raw("−")
		num = -num
	}
	w.b = strconv.AppendInt(w.b, int64(num), 10)
	if den > 1 {
		w.raw("/")
		w.b = strconv.AppendInt(w.b, int64(den), 10)
	}
	w.raw("</sup>")
}

// symbol writes a symbol within a line of text.
func (w *writer) symbol(n maths.Node) {
	if n != nil {
		w.b = maths.AppendMathML(w.b, n)
	}
}
