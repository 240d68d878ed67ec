package figure

import (
	"math"

	"gusset/render/maths"
)

// The measures of a stress element.
const (
	elementSide  = 66.0
	longestArrow = 34.0
	leastArrow   = 10.0
)

// arrowLength is how long the arrow of a component is drawn, 0 for none.
func arrowLength(share float64) float64 {
	if math.Abs(share) < alike {
		return 0
	}
	return math.Max(longestArrow*math.Abs(share), leastArrow)
}

// element draws a stress element: tension pulls outwards, and a positive
// shear stress points up on the right face.
func (s *sketch) element() *Drawing {
	if why := s.finite("sigma_x", "sigma_y", "tau_xy"); why != "" {
		return s.refuse(why, "Stress element")
	}
	st := newStress(s.arg("sigma_x").x, s.arg("sigma_y").x, s.arg("tau_xy").x)
	const h = elementSide / 2
	s.polygon(outline, box(-h, -h, elementSide, elementSide)...)
	force := stroke{ink, firm, nil}
	shear := stroke{teal, firm, nil}
	// The shear arrows lie closest to the faces, the others begin beyond them.
	const shearGap, gap = 5.0, 9.5
	pull := func(share, ux, uy float64) {
		l := arrowLength(share)
		if l == 0 {
			return
		}
		near, far := Point{(h + gap) * ux, -(h + gap) * uy}, Point{(h + gap + l) * ux, -(h + gap + l) * uy}
		if share > 0 {
			s.arrow(force, near, far)
		} else {
			s.arrow(force, far, near)
		}
	}
	pull(st.x, 1, 0)
	pull(st.x, -1, 0)
	pull(st.y, 0, 1)
	pull(st.y, 0, -1)
	if l := arrowLength(st.tau) * 1.5; l > 0 {
		l = math.Copysign(math.Min(l, elementSide*0.8), st.tau) / 2
		s.arrow(shear, Point{h + shearGap, l}, Point{h + shearGap, -l})
		s.arrow(shear, Point{-h - shearGap, -l}, Point{-h - shearGap, l})
		s.arrow(shear, Point{-l, -h - shearGap}, Point{l, -h - shearGap})
		s.arrow(shear, Point{l, h + shearGap}, Point{-l, h + shearGap})
	}
	right := h + gap + arrowLength(st.x)
	top := -h - gap - arrowLength(st.y)
	s.near(s.given("sigma_x"), Point{right, 0}, 4, everywhere, 0)
	s.near(s.given("sigma_y"), Point{0, top}, 4, everywhere, math.Pi/2)
	s.near(s.given("tau_xy").in(teal), Point{h + shearGap, -h - shearGap}, 3, everywhere, math.Pi/4)
	s.tripod(Point{-h - gap - arrowLength(st.x) - 34, h + gap + arrowLength(st.y)})
	sentences := []string{"Arrows that point outwards are tension."}
	switch {
	case st.tau > 0:
		sentences = append(sentences, "The shear stress on the right face points up.")
	case st.tau < 0:
		sentences = append(sentences, "The shear stress on the right face points down.")
	}
	return s.done("Stress element", sentences...)
}

// tripod draws the directions x and y from a corner.
func (s *sketch) tripod(at Point) {
	const length = 20.0
	s.arrow(fine, at, at.plus(length, 0))
	s.arrow(fine, at, at.plus(0, -length))
	s.put(s.label(maths.Symbol{Head: "x"}).in(soft), at.plus(length+3, 2.5))
	s.putAt(s.label(maths.Symbol{Head: "y"}).in(soft), at.plus(0, -length-4), middle)
}
