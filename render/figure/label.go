package figure

import (
	"math"
	"slices"
	"strings"
	"unicode/utf8"

	"gusset/render/fonts"
	"gusset/render/maths"
	"gusset/units"
)

// The sizes of labels, of the figures along axes, of notes and of titles.
const (
	labelSize = 8.4
	tickSize  = 7.4
	noteSize  = 7.6
	titleSize = 8.8
)

// The room that a line of text takes about its baseline, in its size, whatever
// its letters are.
const (
	ascent  = 0.78
	descent = 0.27
)

// label is a text with formulas in it, ready to be put somewhere.
type label struct {
	set    maths.Box
	size   float64
	colour Colour
	plain  string
}

func (l label) in(c Colour) label { l.colour = c; return l }

// The extent of a label about its baseline.
func (l label) above() float64 { return math.Max(l.set.Ascent, ascent*l.size) }
func (l label) below() float64 { return math.Max(l.set.Descent, descent*l.size) }

// stack is a label of two lines.
func stack(upper, lower label) label {
	drop := 1.2*upper.size + math.Max(0, upper.below()-descent*upper.size)
	out := upper
	out.set.Items = slices.Clone(upper.set.Items)
	for _, it := range lower.set.Items {
		it.Y += drop
		out.set.Items = append(out.set.Items, it)
	}
	out.set.Width = math.Max(upper.set.Width, lower.set.Width)
	out.set.Descent = drop + lower.below()
	out.plain += " " + lower.plain
	return out
}

// rect is what a label covers when its baseline starts at a point.
func (l label) rect(at Point) rect {
	return rect{at.X, at.Y - l.above(), at.X + l.set.Width, at.Y + l.below()}
}

// label sets a formula or a text.
func (d *pad) label(n maths.Node) label { return d.labelIn(n, fonts.Sans, labelSize) }

func (d *pad) labelIn(n maths.Node, face *fonts.Face, size float64) label {
	return label{set: maths.Layout(n, size, face), size: size, colour: ink, plain: string(maths.AppendPlain(nil, n))}
}

// words sets a text, blanks in a row taken as one.
func (d *pad) words(s string) label {
	return d.label(maths.Text{Text: strings.Join(strings.Fields(s), " ")})
}

// put draws a label with its baseline starting at a point.
func (d *pad) put(l label, at Point) {
	var runs []Run
	for _, it := range l.set.Items {
		switch it.Kind {
		case maths.Run:
			runs = append(runs, Run{X: at.X + it.X, Y: at.Y + it.Y, Width: it.Width, Face: it.Face, Size: it.Size, Text: it.Text})
		case maths.Rule:
			d.fill(l.colour, box(at.X+it.X, at.Y+it.Y, it.Width, it.Height)...)
		case maths.Outline:
			d.items = append(d.items, Item{Path: glyph(it, at), Colour: l.colour})
		}
	}
	if len(runs) > 0 {
		d.items = append(d.items, Item{Text: runs, Colour: l.colour})
	}
	d.labels = append(d.labels, l.rect(at))
}

// glyph is the outline of a sign drawn from the maths face. Fonts have
// quadratic curves.
func glyph(it maths.Item, at Point) []Segment {
	k := it.Size / 1000
	place := func(p maths.Point) Point { return Point{at.X + it.X + k*p.X, at.Y + it.Y - k*p.Y} }
	var path []Segment
	var last Point
	for _, s := range it.Path {
		p := place(s.P)
		switch s.Kind {
		case maths.Move:
			if len(path) > 0 {
				path = append(path, Segment{Kind: Close})
			}
			path = append(path, Segment{Kind: Move, P: p})
		case maths.Line:
			path = append(path, Segment{Kind: Line, P: p})
		case maths.Curve:
			c := place(s.C)
			path = append(path, Segment{Kind: Curve, P: p,
				C1: Point{last.X + (c.X-last.X)*2/3, last.Y + (c.Y-last.Y)*2/3},
				C2: Point{p.X + (c.X-p.X)*2/3, p.Y + (c.Y-p.Y)*2/3}})
		}
		last = p
	}
	return append(path, Segment{Kind: Close})
}

// anchor is the side of a label that stands at a point.
type anchor int

const (
	left anchor = iota
	middle
	right
)

// putAt draws a label on a baseline, its left end, middle or right end at a
// point.
func (d *pad) putAt(l label, at Point, a anchor) {
	d.put(l, at.plus(-l.set.Width*float64(a)/2, 0))
}

// wrap breaks a text into lines of a width. A word that is wider is broken
// between letters.
func (d *pad) wrap(s string, face *fonts.Face, size, width float64) []label {
	set := func(s string) label { return d.labelIn(maths.Text{Text: s}, face, size) }
	var out []label
	line := ""
	for _, w := range strings.Fields(strings.ToValidUTF8(s, "\uFFFD")) {
		if line != "" && set(line+" "+w).set.Width <= width {
			line += " " + w
			continue
		}
		if line != "" {
			out = append(out, set(line))
		}
		line = w
		for set(line).set.Width > width {
			n := fitting(line, func(s string) bool { return set(s).set.Width <= width })
			if n == len(line) {
				break
			}
			out = append(out, set(line[:n]))
			line = line[n:]
		}
	}
	if line != "" {
		out = append(out, set(line))
	}
	return out
}

// fitting is the length of the longest beginning of a text that fits, one
// character at least.
func fitting(s string, fits func(string) bool) int {
	_, first := utf8.DecodeRuneInString(s)
	n := first
	for n < len(s) {
		_, size := utf8.DecodeRuneInString(s[n:])
		if !fits(s[:n+size]) {
			break
		}
		n += size
	}
	return n
}

func (d *pad) name(name string) maths.Node { return d.maths.Name(name) }

// number is a value in a unit as it is printed.
func (d *pad) number(x float64, u units.Unit, figures int) maths.Node {
	return maths.Number{Value: units.Format(x, figures), Unit: d.maths.Unit(u)}
}

// result sets a symbol with its value, the value heavy.
func (d *pad) result(symbol, value maths.Node) label {
	return d.label(equals(symbol, heavily(value)))
}

// heavily is a value set heavy.
func heavily(n maths.Node) maths.Node {
	switch n := n.(type) {
	case maths.Number:
		n.Governs = true
		return n
	case maths.Row:
		out := make(maths.Row, len(n))
		for i := range n {
			out[i] = heavily(n[i])
		}
		return out
	}
	return n
}

// equals is symbol = value.
func equals(symbol, value maths.Node) maths.Node {
	return maths.Row{symbol, maths.Relation("="), value}
}
