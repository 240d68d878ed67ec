package figure

import (
	"fmt"
	"math"

	"gusset/render/maths"
)

// mostInLap is how many fasteners of a lap are drawn.
const mostInLap = 12

// lap draws a lap with a row of fasteners: the section along the row, and the
// sheared areas in the plane between the plates.
func (s *sketch) lap() *Drawing {
	const title = "Lap with a row of fasteners"
	if why := s.sizes("t_1", "t_2", "d", "p"); why != "" {
		return s.refuse(why, title)
	}
	count := math.Round(s.arg("n").x)
	if !(count >= 1 && count <= 1e6) {
		return s.refuse(fmt.Sprintf("not drawn: %s is no number of fasteners", plainOf(equals(s.symbolOf("n"), s.valueOf("n")))), title)
	}
	d, pitch := s.arg("d").x, 3*s.arg("d").x
	if s.has("p") {
		pitch = s.arg("p").x
	} else if count > 1 {
		s.notes = append(s.notes, "the spacing is not given and drawn as three diameters")
	}
	n := int(math.Min(count, mostInLap))
	if count > mostInLap {
		s.notes = append(s.notes, fmt.Sprintf("%d of %.0f fasteners are drawn", n, count))
	}
	t1, t2 := s.arg("t_1").x, s.arg("t_2").x
	long := float64(n-1)*pitch + 3*d
	k := math.Min(math.Min(250/(long+2.4*d), 120/(t1+t2+1.3*d)), 44/d)
	r, h1, h2, step := k*d/2, k*t1, k*t2, k*pitch
	lapped := k * long
	out := math.Max(2.4*r, 14)
	// The interface lies at 0: the first plate above it goes on to the left, the
	// second one below to the right.
	s.lapPlate(-out, lapped, -h1, 0, false)
	s.lapPlate(0, lapped+out, 0, h2, true)
	for i := range n {
		s.lapFastener(3*r+float64(i)*step, r, h1, h2)
	}
	s.line(plane, Point{-5, 0}, Point{lapped + 5, 0})
	pull := stroke{ink, firm, nil}
	s.arrow(pull, Point{-out - 5, -h1 / 2}, Point{-out - 24, -h1 / 2})
	s.arrow(pull, Point{lapped + out + 5, h2 / 2}, Point{lapped + out + 24, h2 / 2})
	s.near(s.label(maths.Symbol{Head: "P"}), Point{-out - 24, -h1 / 2}, 3, everywhere, math.Pi)
	s.near(s.label(maths.Symbol{Head: "P"}), Point{lapped + out + 24, h2 / 2}, 3, everywhere, 0)
	over := 1.3*r + 4
	s.dimension(Point{lapped, 0}, Point{lapped, -h1}, -13, s.given("t_1"))
	s.dimension(Point{0, 0}, Point{0, h2}, -13, s.given("t_2"))
	y := h2 + over + 22 + r // of the plane seen from above
	if n > 1 && s.has("p") {
		s.dimension(Point{3 * r, -h1 - over}, Point{3*r + step, -h1 - over}, 10, s.given("p"))
	}
	s.lapPlane(y, r, step, lapped, n, count)
	return s.done(title, fmt.Sprintf("%.0f fasteners in a row, each sheared in one plane between the two plates.", count))
}

// lapPlate draws a plate of a lap, broken off where it goes on.
func (s *sketch) lapPlate(x0, x1, y0, y1 float64, right bool) {
	s.fill(wash, box(x0, y0, x1-x0, y1-y0)...)
	end, far := x1, x0
	if right {
		end, far = x0, x1
	}
	s.line(outline, Point{far, y0}, Point{end, y0}, Point{end, y1}, Point{far, y1})
	s.broken(Point{far, y1}, Point{far, y0})
}

// lapFastener draws a fastener with its head and its nut.
func (s *sketch) lapFastener(x, r, h1, h2 float64) {
	head := 1.3 * r
	s.fill(white, box(x-r, -h1, 2*r, h1+h2)...)
	s.polygon(outline, box(x-r, -h1, 2*r, h1+h2)...)
	for _, y := range []float64{-h1 - head, h2} {
		s.fill(white, box(x-1.7*r, y, 3.4*r, head)...)
		s.polygon(outline, box(x-1.7*r, y, 3.4*r, head)...)
	}
	s.line(centre, Point{x, -h1 - head - 4}, Point{x, h2 + head + 4})
}

// lapPlane draws the plane between the plates with the areas sheared in it.
func (s *sketch) lapPlane(y, r, step, lapped float64, n int, count float64) {
	s.polygon(fine, box(0, y-1.8*r, lapped, 3.6*r)...)
	for i := range n {
		c := Point{3*r + float64(i)*step, y}
		s.hatch(hatching, math.Min(3.2, math.Max(r/2, 1)), round(c, r)...)
		s.circle(outline, c, r)
	}
	s.dimension(Point{4 * r, y + 1.8*r}, Point{2 * r, y + 1.8*r}, 12, s.given("d"))
	d := s.arg("d").x
	words := maths.Text{Text: fmt.Sprintf("%.0f shear planes, each", count)}
	if count == 1 {
		words.Text = "1 shear plane,"
	}
	// Clear of the diameter's name below the first fastener.
	s.putAt(s.label(maths.Row{words, maths.Blank, s.circleArea("d")}), Point{lapped / 2, y + 1.8*r + 40}, middle)
	if count > 1 {
		total := maths.Row{maths.Text{Text: "together"}, maths.Blank, maths.Number{Value: fmt.Sprintf("%.0f", count)}, maths.Dot, s.name("A"), maths.Relation("="), s.area("d", count*math.Pi*d*d/4)}
		s.putAt(s.label(total), Point{lapped / 2, y + 1.8*r + 52}, middle)
	}
}
