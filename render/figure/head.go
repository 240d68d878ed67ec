package figure

import (
	"math"

	"gusset/render/maths"
)

// pulledThrough draws a plate pulled through by a head: the section, and the
// sheared surface unrolled.
func (s *sketch) pulledThrough() *Drawing {
	const title = "Plate pulled through by a head"
	if why := s.sizes("d", "t", "d_s", "l"); why != "" {
		return s.refuse(why, title)
	}
	d, t := s.arg("d").x, s.arg("t").x
	shank := 0.5 * d
	if s.has("d_s") {
		if shank = s.arg("d_s").x; shank >= d {
			return s.refuse("not drawn: the shank is no thinner than the outline of the head", title)
		}
	}
	perimeter, outlineOf := s.outlineOfHead(d)
	k := math.Min(math.Min(136/(2.2*d), 150/perimeter), 96/(t+0.9*d))
	r, rs, h := k*d/2, k*shank/2, k*t
	headHeight, stub, half := 0.7*r, 0.8*r+10, 2.2*r
	// The plate lies with its upper face at 0; the head sits on it.
	for _, side := range []float64{-1, 1} {
		s.fill(wash, box(math.Min(side*rs, side*half), 0, half-rs, h)...)
		s.line(outline, Point{side * half, 0}, Point{side * rs, 0}, Point{side * rs, h}, Point{side * half, h})
		s.broken(Point{side * half, h}, Point{side * half, 0})
		s.hatch(hatching, 3.2, box(math.Min(side*rs, side*r), 0, r-rs, h)...)
	}
	bolt := []Point{{-r, -headHeight}, {r, -headHeight}, {r, 0}, {rs, 0}, {rs, h + stub}, {-rs, h + stub}, {-rs, 0}, {-r, 0}}
	s.fill(white, bolt...)
	line := outline
	if !s.has("d_s") {
		line = hidden
	}
	s.line(line, Point{-rs, 0}, Point{-rs, h + stub})
	s.line(line, Point{rs, 0}, Point{rs, h + stub})
	s.broken(Point{-rs, h + stub}, Point{rs, h + stub})
	s.polygon(outline, box(-r, -headHeight, 2*r, headHeight)...)
	s.line(centre, Point{0, -headHeight - 6}, Point{0, h + stub + 4})
	for _, x := range []float64{-r, r} {
		s.line(plane, Point{x, -1}, Point{x, h + 4})
	}
	foot := h + stub + 6
	if s.has("d_s") {
		foot += 12
	}
	s.arrow(stroke{ink, firm, nil}, Point{0, foot}, Point{0, foot + 18})
	s.near(s.label(maths.Symbol{Head: "P"}), Point{0, foot + 18}, 3, everywhere, -math.Pi/2)
	if s.has("d_s") {
		s.dimension(Point{rs, h + stub + 2}, Point{-rs, h + stub + 2}, 9, s.given("d_s"))
	}
	s.dimension(Point{-r, -headHeight}, Point{r, -headHeight}, 15, s.given("d"))
	s.dimension(Point{-half, h}, Point{-half, 0}, 13, s.given("t"))
	// The surface that is sheared, unrolled.
	length := k * perimeter
	x := half + 44
	s.hatch(hatching, 3.2, box(x, 0, length, h)...)
	s.polygon(outline, box(x, 0, length, h)...)
	s.dimension(Point{x + length, h}, Point{x, h}, 15, s.label(maths.Row{outlineOf, maths.Relation("="), s.like("d", perimeter)}))
	s.putAt(s.words("the sheared surface, unrolled"), Point{x + length/2, -26}, middle)
	area := maths.Row{s.name("A"), maths.Relation("="), outlineOf, maths.Beside, s.factorOf("t"), maths.Relation("="), s.area("d", perimeter*t)}
	s.putAt(s.label(area), Point{x + length/2, -13}, middle)
	if !s.has("d_s") {
		s.notes = append(s.notes, "the size of the shank is not given")
	}
	return s.done(title, "The plate is sheared along a surface below the edge of the head, with the area "+plainOf(s.area("d", perimeter*t))+".")
}

// outlineOfHead is the outline that a head is sheared along: a circle of
// diameter d, or with a length given a rectangle of that length and the width d.
func (s *sketch) outlineOfHead(d float64) (float64, maths.Node) {
	if !s.has("l") {
		return math.Pi * d, maths.Row{s.name("π"), maths.Beside, s.factorOf("d")}
	}
	sum := maths.Row{s.symbolOf("d"), maths.Plus, s.symbolOf("l")}
	return 2 * (d + s.arg("l").x), maths.Row{maths.Number{Value: "2"}, maths.Beside, maths.Paren(sum)}
}
