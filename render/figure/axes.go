package figure

import (
	"math"

	"gusset/render/fonts"
	"gusset/render/maths"
	"gusset/units"
)

// axes is the frame of a plot: its field is from the origin at its lower left
// corner to the right and up.
type axes struct {
	x, y          scale
	width, height float64
}

// point is where a pair of values lies in the field.
func (a *axes) point(x, y float64) Point {
	return Point{a.width * a.x.at(x), -a.height * a.y.at(y)}
}

func (a *axes) field() rect { return rect{0, -a.height, a.width, 0} }

// ticksAlong are as many steps as an axis of a length has room for, given the
// largest figures along it.
func (d *pad) ticksAlong(u units.Unit, over [2]float64, length float64) scale {
	for most := 8; ; most-- {
		s := scaleIn(u, over, true, most)
		widest := 0.0
		for _, t := range s.ticks {
			widest = math.Max(widest, d.tick(&s, t).set.Width)
		}
		if most <= 2 || float64(most)*(widest+9) <= length {
			return s
		}
	}
}

func (d *pad) tick(s *scale, t float64) label {
	return d.labelIn(maths.Number{Value: s.figures(t)}, fonts.Sans, tickSize)
}

// title is what an axis shows: the symbols and in brackets the unit, with the
// power of ten that its figures leave out.
func (d *pad) axisTitle(symbols []maths.Node, u units.Unit, power int) label {
	var row maths.Row
	for i, s := range symbols {
		if i > 0 {
			row = append(row, maths.Comma)
		}
		row = append(row, s)
	}
	var unit maths.Row
	if power != 0 {
		unit = append(unit, maths.Script{Base: maths.Number{Value: "10"}, Sup: maths.Number{Value: units.Format(float64(power), 1)}})
	}
	if terms := d.maths.Unit(u); len(terms) > 0 {
		if len(unit) > 0 {
			unit = append(unit, maths.Blank)
		}
		unit = append(unit, terms)
	}
	if len(unit) > 0 {
		row = append(row, maths.Blank, maths.Op{Sign: "[", Class: maths.Open}, unit, maths.Op{Sign: "]", Class: maths.Close})
	}
	return d.label(row)
}

// frame draws the grid, the axes, their figures and titles; it returns the
// left edge of what it drew.
func (d *pad) frame(a *axes, xTitle, yTitle label) float64 {
	grid := stroke{hair, 0.4, nil}
	edge := 0.0
	for _, t := range a.y.ticks {
		y := -a.height * a.y.along(t)
		d.faint(grid, Point{0, y}, Point{a.width, y})
		d.faint(axisLine, Point{-3, y}, Point{0, y})
		l := d.tick(&a.y, t)
		d.putAt(l, Point{-5.5, y + 0.36*tickSize}, right)
		edge = math.Min(edge, -5.5-l.set.Width)
	}
	for _, t := range a.x.ticks {
		x := a.width * a.x.along(t)
		d.faint(grid, Point{x, 0}, Point{x, -a.height})
		d.faint(axisLine, Point{x, 0}, Point{x, 3})
		d.putAt(d.tick(&a.x, t), Point{x, 11.5}, middle)
	}
	d.line(axisLine, Point{0, -a.height}, Point{0, 0}, Point{a.width, 0})
	if y := a.y.along(0); y > alike && y < 1-alike {
		d.line(axisLine, Point{0, -a.height * y}, Point{a.width, -a.height * y})
	}
	if x := a.x.along(0); x > alike && x < 1-alike {
		d.line(axisLine, Point{a.width * x, -a.height}, Point{a.width * x, 0})
	}
	d.putAt(xTitle, Point{a.width / 2, 23.5}, middle)
	d.put(yTitle, Point{edge, -a.height - 8})
	return edge
}
