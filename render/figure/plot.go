package figure

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"gusset/notebook/eval"
	"gusset/render/fonts"
	"gusset/render/maths"
	"gusset/units"
)

// plotHeight is the height of a plot's field, where the names of its curves
// need no more.
const plotHeight = 178

// dashes tell curves from each other without colour.
var dashes = [][]float64{
	nil, {8, 3}, {8, 2.5, 1.6, 2.5}, {1.6, 2.2}, {8, 2.5, 1.6, 2.5, 1.6, 2.5}, {4, 2}, {12, 3, 4, 3}, {14, 4},
}

var curveColours = []Colour{ink, teal, green}

// limitStroke is the line of a limit: no curve is as thin, short and even.
var limitStroke = stroke{red, 0.8, []float64{3.2, 2}}

// curve is a curve on its way to paper.
type curve struct {
	*eval.Curve
	stroke stroke
	parts  [][]Point // in the field, parted at its breaks
	points []Point   // of all parts
	name   []label   // line by line
}

// Plot draws curves over the range of a swept value, with their limits and their
// present values.
func Plot(p *eval.Plot) *Drawing {
	d := newPad()
	symbols := d.symbols(p.Curves)
	curves := d.curves(p)
	a := &axes{height: math.Max(plotHeight, 1.1*stacked(curves))}
	a.y = scaleIn(p.Y.Unit, reach(p), false, 6)
	figures, names := 0.0, 0.0
	for _, t := range a.y.ticks {
		figures = math.Max(figures, d.tick(&a.y, t).set.Width)
	}
	for i := range curves {
		names = math.Max(names, widest(curves[i].name))
	}
	a.width = math.Max(column-4-figures-6-names-nameAt(p), 120)
	a.x = d.ticksAlong(p.X.Unit, swept(p), a.width)
	for i := range curves {
		curves[i].parts = a.course(curves[i].Curve)
		curves[i].points = slices.Concat(curves[i].parts...)
	}
	along := d.name(p.X.Symbol)
	edge := d.frame(a, d.axisTitle([]maths.Node{along}, p.X.Unit, a.x.power), d.axisTitle(symbols, p.Y.Unit, a.y.power))
	for i := range curves {
		for _, part := range curves[i].parts {
			d.line(curves[i].stroke, part...)
		}
	}
	d.names(a, curves, nameAt(p))
	d.present(p, a)
	d.heading(p.Title, Point{edge, -a.height - 22})
	d.governing(p.Curves)
	title := p.Title
	if title == "" {
		title = fmt.Sprintf("%s against %s", plainList(symbols), maths.AppendPlain(nil, along))
	}
	return d.finish(title, d.described([]string{d.describe(p)}))
}

// nameAt is how far from the field the names of the curves stand: where there
// are several curves a piece of its line stands beside each name.
func nameAt(p *eval.Plot) float64 {
	if len(p.Curves) > 1 {
		return 30
	}
	return 11
}

// curves gives each curve and limit its line and its name: the mark alone where
// all are of one quantity.
func (d *pad) curves(p *eval.Plot) []curve {
	var out []curve
	for i := range p.Curves {
		c := &p.Curves[i]
		s := stroke{curveColours[i%len(curveColours)], 1.2, dashes[i%len(dashes)]}
		name := d.nameOf(c, nil)
		if c.Mark != "" && len(d.symbols(p.Curves)) == 1 {
			name = d.wrap(c.Mark, fonts.Sans, labelSize, nameRoom)
		}
		out = append(out, curve{Curve: c, stroke: s, name: name})
	}
	for i := range p.Limits {
		c := &p.Limits[i]
		var value maths.Node
		if steady(c.Y) {
			value = d.maths.Pieces(c.Present, maths.Ref{})
		}
		out = append(out, curve{Curve: c, stroke: limitStroke, name: d.nameOf(c, value)})
	}
	return out
}

// nameRoom is the width of the names beside a plot.
const nameRoom = 92

// nameOf is how a curve is called beside its end: its symbol, with the value of one
// that stays the same, and its mark.
func (d *pad) nameOf(c *eval.Curve, value maths.Node) []label {
	symbol := d.name(c.Symbol)
	lines := []label{d.label(symbol)}
	if value != nil {
		if whole := d.label(equals(symbol, value)); whole.set.Width <= nameRoom {
			lines[0] = whole
		} else {
			lines = append(lines, d.label(value))
		}
	}
	return append(lines, d.wrap(c.Mark, fonts.Sans, noteSize, nameRoom)...)
}

// steady tells whether a curve stays where it is.
func steady(y []float64) bool {
	low, high := ends(y)
	return high-low <= alike*math.Max(math.Abs(low), math.Abs(high))
}

// ends are the least and the largest of the numbers that are finite, 0 where
// there are none.
func ends(list ...[]float64) (low, high float64) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, x := range list {
		for _, v := range x {
			if !math.IsNaN(v) && !math.IsInf(v, 0) {
				low, high = math.Min(low, v), math.Max(high, v)
			}
		}
	}
	if low > high {
		return 0, 0
	}
	return low, high
}

// swept is the range along the plot.
func swept(p *eval.Plot) [2]float64 {
	var list [][]float64
	for _, c := range p.Curves {
		list = append(list, c.X)
	}
	low, high := ends(list...)
	return [2]float64{low, high}
}

// reach is the range of all that is drawn.
func reach(p *eval.Plot) [2]float64 {
	var list [][]float64
	for _, c := range p.Curves {
		list = append(list, c.Y)
		if isPresent(p) {
			list = append(list, []float64{c.At})
		}
	}
	for _, c := range p.Limits {
		list = append(list, c.Y)
	}
	low, high := ends(list...)
	return [2]float64{low, high}
}

// isPresent tells whether the present value lies in the range.
func isPresent(p *eval.Plot) bool {
	x := swept(p)
	dust := alike * math.Max(math.Abs(x[0]), math.Abs(x[1]))
	return p.At >= x[0]-dust && p.At <= x[1]+dust
}

// course is a curve in the field, in parts, without the points that lie on the
// straight line between their neighbours as far as can be seen.
func (a *axes) course(c *eval.Curve) [][]Point {
	var parts [][]Point
	var points []Point
	for i := range c.X {
		if p := a.point(c.X[i], c.Y[i]); !math.IsNaN(p.X) && !math.IsNaN(p.Y) && !math.IsInf(p.X, 0) && !math.IsInf(p.Y, 0) {
			points = append(points, p)
		}
		if i == len(c.X)-1 || slices.Contains(c.Breaks, i) {
			parts = append(parts, thinned(points))
			points = nil
		}
	}
	return parts
}

// thinned leaves out points (Douglas and Peucker 1973).
func thinned(points []Point) []Point {
	const unseen = 0.02
	if len(points) < 3 {
		return points
	}
	keep := make([]bool, len(points))
	keep[0], keep[len(points)-1] = true, true
	parts := [][2]int{{0, len(points) - 1}}
	for len(parts) > 0 {
		from, to := parts[len(parts)-1][0], parts[len(parts)-1][1]
		parts = parts[:len(parts)-1]
		furthest, at := unseen, 0
		for i := from + 1; i < to; i++ {
			if away := points[i].from(points[from], points[to]); away > furthest {
				furthest, at = away, i
			}
		}
		if at > 0 {
			keep[at] = true
			parts = append(parts, [2]int{from, at}, [2]int{at, to})
		}
	}
	var out []Point
	for i, p := range points {
		if keep[i] {
			out = append(out, p)
		}
	}
	return out
}

// from is how far a point lies from the line through two others.
func (p Point) from(a, b Point) float64 {
	dx, dy := b.X-a.X, b.Y-a.Y
	if dx == 0 && dy == 0 {
		return math.Hypot(p.X-a.X, p.Y-a.Y)
	}
	return math.Abs((p.X-a.X)*dy-(p.Y-a.Y)*dx) / math.Hypot(dx, dy)
}

// present marks the curves' present values with dots and prints them, and the
// swept value that they belong to.
func (d *pad) present(p *eval.Plot, a *axes) {
	at := equals(d.name(p.X.Symbol), d.maths.Pieces(p.Present, maths.Ref{}))
	if !isPresent(p) {
		d.notes = append(d.notes, fmt.Sprintf("the present value %s lies outside the range", maths.AppendPlain(nil, at)))
		return
	}
	top, governs := 0.0, 0
	for i, c := range p.Curves {
		q := a.point(p.At, c.At)
		if top = math.Min(top, q.Y); math.Abs(c.At) > math.Abs(p.Curves[governs].At) {
			governs = i
		}
	}
	x := a.point(p.At, 0).X
	if len(p.Curves) > 0 {
		d.line(stroke{soft, 0.6, []float64{1.2, 1.8}}, Point{x, top}, Point{x, 0})
	}
	for _, c := range p.Curves {
		d.dot(a.point(p.At, c.At))
	}
	// Of many values the largest alone is printed: the calc has a table of all.
	const most = 4
	for i, c := range p.Curves {
		if len(p.Curves) <= most || i == governs {
			d.near(d.labelIn(d.maths.Pieces(c.Present, maths.Ref{}), fonts.SansSemiBold, labelSize), a.point(p.At, c.At), 5, a.field(), math.Pi/4, 3*math.Pi/4, -math.Pi/4, -3*math.Pi/4)
		}
	}
	d.near(d.label(at), Point{x, -9}, 3, a.field(), 0, math.Pi)
}

// heading puts a title above a drawing, its lines upward from a point.
func (d *pad) heading(title string, at Point) {
	lines := d.wrap(title, fonts.SansSemiBold, titleSize, column-8)
	for i, l := range lines {
		d.put(l, at.plus(0, -1.35*titleSize*float64(len(lines)-1-i)))
	}
}

// governing says where one curve stands for many.
func (d *pad) governing(curves []eval.Curve) {
	drawn := map[string]int{}
	for _, c := range curves {
		drawn[c.ID]++
	}
	for _, c := range curves {
		if c.Of > drawn[c.ID] {
			d.notes = append(d.notes, fmt.Sprintf("%s has a curve for each of %d entries; that of %s is drawn, which governs", maths.AppendPlain(nil, d.name(c.Symbol)), c.Of, c.Mark))
		}
	}
}

// symbols are the symbols of the curves, each once.
func (d *pad) symbols(curves []eval.Curve) []maths.Node {
	var out []maths.Node
	seen := map[string]bool{}
	for _, c := range curves {
		if !seen[c.Symbol] {
			seen[c.Symbol] = true
			out = append(out, d.name(c.Symbol))
		}
	}
	return out
}

func plainList(nodes []maths.Node) string {
	var list []string
	for _, n := range nodes {
		list = append(list, string(maths.AppendPlain(nil, n)))
	}
	return strings.Join(list, ", ")
}

// describe says in words what a plot shows.
func (d *pad) describe(p *eval.Plot) string {
	var b strings.Builder
	value := func(x float64, u units.Unit) string {
		return string(maths.AppendPlain(nil, d.number(x, u, 4)))
	}
	plainName := func(c *eval.Curve) string {
		s := string(maths.AppendPlain(nil, d.name(c.Symbol)))
		if c.Mark != "" {
			s += " (" + c.Mark + ")"
		}
		return s
	}
	x := swept(p)
	fmt.Fprintf(&b, "%s from %s to %s.", maths.AppendPlain(nil, d.name(p.X.Symbol)), value(x[0], p.X.Unit), value(x[1], p.X.Unit))
	for i := range p.Curves {
		c := &p.Curves[i]
		if len(c.Y) > 0 {
			fmt.Fprintf(&b, " %s runs from %s to %s", plainName(c), value(c.Y[0], p.Y.Unit), value(c.Y[len(c.Y)-1], p.Y.Unit))
			fmt.Fprintf(&b, "; its present value is %s.", maths.AppendPlain(nil, d.maths.Pieces(c.Present, maths.Ref{})))
		}
	}
	for i := range p.Limits {
		fmt.Fprintf(&b, " Limit %s, at present %s.", plainName(&p.Limits[i]), maths.AppendPlain(nil, d.maths.Pieces(p.Limits[i].Present, maths.Ref{})))
	}
	return b.String()
}
