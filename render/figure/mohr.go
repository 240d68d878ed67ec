package figure

import (
	"fmt"
	"math"

	"gusset/render/fonts"
	"gusset/render/maths"
)

// stress is a plane state of stress: tension positive, tau positive where it
// pulls the x face towards +y. Values are shares of size, so that none
// overflows.
type stress struct {
	x, y, tau float64
	size      float64
}

// newStress takes a state in Pa.
func newStress(x, y, tau float64) stress {
	size := math.Max(math.Max(math.Abs(x), math.Abs(y)), math.Abs(tau))
	if size == 0 {
		return stress{}
	}
	return stress{x / size, y / size, tau / size, size}
}

// circle is the centre and the radius of Mohr's circle, and the angle from x
// to the direction of the larger principal stress, counter-clockwise, as the
// helper plane_stress has it.
func (s stress) circle() (centre, radius, angle float64) {
	centre = (s.x + s.y) / 2
	radius = math.Hypot((s.x-s.y)/2, s.tau)
	angle = math.Atan2(s.tau, (s.x-s.y)/2) / 2
	if angle <= -math.Pi/2 {
		angle += math.Pi
	}
	return centre, radius, angle
}

// The measures of Mohr's circle.
const (
	mohrDiameter = 132.0
	mohrSpan     = 196.0 // from the origin to the far side of the circle
	mohrFurthest = 6.0   // radii from side to side with the origin, beyond which the axis is broken
)

// mohr draws Mohr's circle with the shear stress of the x face downwards, so
// that angles turn as they do in the part (Gere & Goodno, Mechanics of
// Materials, 7.4).
func (s *sketch) mohr() *Drawing {
	if why := s.finite("sigma_x", "sigma_y", "tau_xy"); why != "" {
		return s.refuse(why, "Mohr's circle")
	}
	st := newStress(s.arg("sigma_x").x, s.arg("sigma_y").x, s.arg("tau_xy").x)
	c, r, angle := st.circle()
	if r <= 1e-9 {
		return s.mohrPoint(st, c)
	}
	low, high := math.Min(c-r, 0), math.Max(c+r, 0)
	broken := high-low > mohrFurthest*r
	k := math.Min(mohrDiameter/(2*r), mohrSpan/(high-low))
	if broken {
		k = mohrDiameter / (2 * r)
	}
	at := func(sigma, tau float64) Point { return Point{k * (sigma - c), k * tau} }
	s.mohrAxes(c, k*r, at(0, 0).X, broken)
	s.circle(outline, Point{}, k*r)
	x, y := at(st.x, st.tau), at(st.y, -st.tau)
	s.line(stroke{teal, firm, nil}, x, y)
	s.line(hidden, Point{0, k * r}, Point{0, -k * r})
	for _, p := range []Point{{}, at(c+r, 0), at(c-r, 0), {0, -k * r}, x, y} {
		s.dot(p)
	}
	s.mohrAngle(k*r, angle)
	s.mohrLabels(st, c, r, x, y, k*r)
	s.notes = append(s.notes, "shear stresses on the x face are drawn downwards, so that angles turn as in the part")
	if (c-r)*(c+r) > 0 {
		tau := s.like("tau_xy", st.size*(math.Abs(c)+r)/2)
		s.notes = append(s.notes, fmt.Sprintf("the largest shear stress over all planes lies outside this one: %s", plainOf(tau)))
	}
	return s.done("Mohr's circle", fmt.Sprintf("The circle has its centre at %s and the radius %s; the principal stresses are %s and %s, the larger at %s from x, counter-clockwise.",
		plainOf(s.like("sigma_x", st.size*c)), plainOf(s.like("sigma_x", st.size*r)),
		plainOf(s.like("sigma_x", st.size*(c+r))), plainOf(s.like("sigma_x", st.size*(c-r))), plainOf(degrees(s.pad, angle))))
}

// mohrPoint is the circle of a state that is the same in all directions.
func (s *sketch) mohrPoint(st stress, c float64) *Drawing {
	origin := 0.0
	switch {
	case c > 0:
		origin = -90
	case c < 0:
		origin = 90
	}
	s.mohrAxes(c, 40, origin, false)
	s.dot(Point{})
	value := s.like("sigma_x", st.size*c)
	s.near(s.label(maths.Row{s.name("σ_1"), maths.Relation("="), s.name("σ_2"), maths.Relation("="), value}), Point{}, 6, everywhere, math.Pi/4, -math.Pi/4)
	s.notes = append(s.notes, "the circle is a point: the stress is the same in all directions of the plane, without shear")
	return s.done("Mohr's circle", "Both principal stresses are "+plainOf(value)+".")
}

// mohrAxes draws the axes of a circle of radius r about the origin of the
// drawing; zero is where no stress lies.
func (s *sketch) mohrAxes(c, r, zero float64, broken bool) {
	const over = 26.0
	if broken {
		zero = math.Copysign(r+34, zero)
	}
	from, to := math.Min(-r, zero)-over, math.Max(r, zero)+over
	s.arrow(axisLine, Point{from, 0}, Point{to, 0})
	s.arrow(axisLine, Point{zero, -r - 14}, Point{zero, r + 24})
	if broken {
		m := math.Copysign(r+16, zero)
		s.fill(white, Point{m - 4, 4}, Point{m - 1, -4}, Point{m + 4, -4}, Point{m + 1, 4})
		s.line(axisLine, Point{m - 4, 4}, Point{m - 1, -4})
		s.line(axisLine, Point{m + 1, 4}, Point{m + 4, -4})
	}
	unit := s.arg("sigma_x").step.Unit
	s.put(s.axisTitle([]maths.Node{s.name("σ")}, unit, 0), Point{to + 4, 3})
	s.putAt(s.axisTitle([]maths.Node{s.name("τ")}, unit, 0), Point{zero, r + 34}, middle)
	s.near(s.labelIn(maths.Number{Value: "0"}, fonts.Sans, tickSize), Point{zero, 0}, 2, everywhere, 5*math.Pi/4, -math.Pi/4)
}

// mohrAngle draws twice the angle between x and the larger principal stress.
func (s *sketch) mohrAngle(r, angle float64) {
	if math.Abs(angle) < 0.01 {
		return
	}
	const head = 5.0
	radius := math.Min(0.45*r, 28)
	line := stroke{teal, thin, nil}
	s.arc(line, Point{}, radius, -2*angle, 2*angle)
	if turn := math.Copysign(1, angle); radius*math.Abs(2*angle) > head {
		s.pad.head(teal, Point{radius, 0}, 0.12*turn, -turn, head)
	}
	l := s.label(maths.Row{maths.Number{Value: "2"}, maths.Beside, s.name("θ_p")}).in(teal)
	s.near(l, Point{}.toward(-angle, radius), 2, everywhere, -angle)
}

func (s *sketch) mohrLabels(st stress, c, r float64, x, y Point, radius float64) {
	value := func(of string, share float64) maths.Node { return s.like(of, st.size*share) }
	s.near(s.result(s.name("σ_1"), value("sigma_x", c+r)), Point{radius, 0}, 5, everywhere, math.Pi/5, -math.Pi/5)
	s.near(s.result(s.name("σ_2"), value("sigma_x", c-r)), Point{-radius, 0}, 5, everywhere, 4*math.Pi/5, -4*math.Pi/5)
	s.near(s.result(s.name("τ_max"), value("tau_xy", r)), Point{0, -radius}, 5, everywhere, math.Pi/2, math.Pi/3, 2*math.Pi/3)
	pair := func(letter string, sigma, tau maths.Node) label {
		return s.label(maths.Row{maths.Word{Text: letter}, maths.Blank, maths.Paren(maths.Row{sigma, maths.Comma, tau})})
	}
	bare := func(share float64) maths.Node {
		n := s.like("sigma_x", st.size*share).(maths.Number)
		n.Unit = nil
		return n
	}
	s.near(pair("x", bare(st.x), bare(st.tau)).in(teal), x, 5, everywhere, math.Atan2(-x.Y, x.X))
	s.near(pair("y", bare(st.y), bare(-st.tau)).in(teal), y, 5, everywhere, math.Atan2(-y.Y, y.X))
	_, _, angle := st.circle()
	s.near(s.label(equals(s.name("σ_m"), value("sigma_x", c))), Point{0, radius}, 4, everywhere, -math.Pi/2, -math.Pi/3, -2*math.Pi/3)
	// The angle of the part stands in the corner that the diameter leaves free.
	end := x
	if y.X > x.X {
		end = y
	}
	corner := math.Copysign(1, end.Y)
	s.about(s.result(s.name("θ_p"), degrees(s.pad, angle)), Point{radius, -corner * radius}, 2, 0, corner*math.Pi/4)
}
