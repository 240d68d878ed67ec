package figure

import (
	"fmt"
	"math"

	"gusset/render/maths"
)

// hatching marks areas that are sheared.
var hatching = stroke{red, 0.5, nil}

// circleArea is A = π·d²/4 and its value.
func (s *sketch) circleArea(of string) maths.Node {
	d := s.arg(of).x
	square := maths.Script{Base: s.factorOf(of), Sup: maths.Number{Value: "2"}}
	formula := maths.Row{s.name("π"), maths.Beside, square, maths.Slash, maths.Number{Value: "4"}}
	return maths.Row{s.name("A"), maths.Relation("="), formula, maths.Relation("="), s.area(of, math.Pi*d*d/4)}
}

// sheared draws the section of a round part, hatched, with its diameter, and
// what it is the area of.
func (s *sketch) sheared(c Point, r float64, of, what string) {
	s.hatch(hatching, 3.2, round(c, r)...)
	s.circle(outline, c, r)
	s.line(centre, c.plus(-r-5, 0), c.plus(r+5, 0))
	s.line(centre, c.plus(0, -r-5), c.plus(0, r+5))
	s.dimension(Point{c.X + r, c.Y + r}, Point{c.X - r, c.Y + r}, 14, s.given(of))
	s.putAt(s.words(what), c.plus(0, -r-25), middle)
	s.putAt(s.label(s.circleArea(of)), c.plus(0, -r-12), middle)
}

// pin draws a pin in double shear: the section along it, and the area that
// each of its two planes has.
func (s *sketch) pin() *Drawing {
	const title = "Pin in double shear"
	if why := s.sizes("d", "t_1", "t_2"); why != "" {
		return s.refuse(why, title)
	}
	gap := 0.0
	if s.has("g") {
		if why := s.finite("g"); why != "" {
			return s.refuse(why, title)
		}
		if gap = s.arg("g").x; gap < 0 {
			return s.refuse(fmt.Sprintf("not drawn: %s is no gap", plainOf(equals(s.symbolOf("g"), s.valueOf("g")))), title)
		}
	}
	d, t1, t2 := s.arg("d").x, s.arg("t_1").x, s.arg("t_2").x
	long := 2*t1 + 2*gap + t2
	k := math.Min(math.Min(150/(long+0.6*d), 150/(3.2*d)), 90/d)
	r, w1, w2, g := k*d/2, k*t1, k*t2, k*gap
	top, bottom := -3.2*r, 3.2*r // where the plates go on
	// The plates from left to right; the inner one goes up, the outer ones down.
	x1, x2 := w1+g, w1+g+w2 // the inner plate
	x3 := x2 + g
	end := x3 + w1
	s.plate(0, w1, -1.9*r, bottom, false)
	s.plate(x1, x2, top, 1.9*r, true)
	s.plate(x3, end, -1.9*r, bottom, false)
	over := 0.6 * r
	s.fill(white, box(-over, -r, end+2*over, 2*r)...)
	s.polygon(outline, box(-over, -r, end+2*over, 2*r)...)
	s.line(centre, Point{-over - 7, 0}, Point{end + over + 7, 0})
	for _, x := range []float64{w1 + g/2, x2 + g/2} {
		s.line(plane, Point{x, -r - 5}, Point{x, r + 5})
	}
	pull := stroke{ink, firm, nil}
	s.arrow(pull, Point{w1 / 2, bottom + 3}, Point{w1 / 2, bottom + 21})
	s.arrow(pull, Point{x3 + w1/2, bottom + 3}, Point{x3 + w1/2, bottom + 21})
	s.arrow(pull, Point{(x1 + x2) / 2, top - 3}, Point{(x1 + x2) / 2, top - 21})
	s.near(s.label(divided(s.name("P"), "2")), Point{w1 / 2, bottom + 21}, 3, everywhere, -math.Pi/2)
	s.near(s.label(divided(s.name("P"), "2")), Point{x3 + w1/2, bottom + 21}, 3, everywhere, -math.Pi/2)
	s.near(s.label(s.name("P")), Point{(x1 + x2) / 2, top - 21}, 3, everywhere, math.Pi/2)
	// Dimensions: the outer plate and the gap over the top, the inner below.
	s.dimension(Point{0, -1.9 * r}, Point{w1, -1.9 * r}, 12, s.given("t_1"))
	if gap > 0 {
		s.dimension(Point{x2, -1.9 * r}, Point{x3, -1.9 * r}, 12, s.given("g"))
	}
	s.dimension(Point{x2, 1.9 * r}, Point{x1, 1.9 * r}, 14, s.given("t_2"))
	s.sheared(Point{end + over + 48 + math.Max(r, 50), 0}, r, "d", "each of the 2 shear planes")
	return s.done(title, "The pin passes through two outer plates and one inner plate and is sheared along two planes.")
}

// plate draws a plate seen on its edge, its end on one side broken off.
func (s *sketch) plate(x0, x1, y0, y1 float64, up bool) {
	s.fill(wash, box(x0, y0, x1-x0, y1-y0)...)
	from, to := y1, y0 // from the end to where it is broken off
	if !up {
		from, to = y0, y1
	}
	s.line(outline, Point{x0, to}, Point{x0, from}, Point{x1, from}, Point{x1, to})
	s.broken(Point{x0, to}, Point{x1, to})
}

// broken draws the line where a part goes on that is not drawn.
func (s *sketch) broken(a, b Point) {
	length := math.Hypot(b.X-a.X, b.Y-a.Y)
	if length == 0 {
		return
	}
	ux, uy := (b.X-a.X)/length, (b.Y-a.Y)/length
	const tooth, out = 3.0, 2.6
	m := Point{(a.X + b.X) / 2, (a.Y + b.Y) / 2}
	points := []Point{a.plus(-out*ux, -out*uy), m.plus(-tooth*ux, -tooth*uy), m.plus(-tooth/2*ux+out*uy, -tooth/2*uy-out*ux),
		m.plus(tooth/2*ux-out*uy, tooth/2*uy+out*ux), m.plus(tooth*ux, tooth*uy), b.plus(out*ux, out*uy)}
	if length < 4*tooth {
		points = []Point{a.plus(-out*ux, -out*uy), b.plus(out*ux, out*uy)}
	}
	s.line(fine, points...)
}
