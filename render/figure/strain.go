package figure

import (
	"fmt"
	"math"

	"gusset/render/maths"
)

// exaggeration is by how much an angle is drawn larger than it is, so that it
// can be seen and the block is not laid flat: 1 for angles from 0.08 to 0.6 rad,
// else 1, 2 or 5 times a power of ten.
func exaggeration(angle float64) float64 {
	const visible, steep, aim = 0.08, 0.6, 0.36
	angle = math.Abs(angle)
	if angle >= visible && angle <= steep || !(angle > vanishing) {
		return 1
	}
	exponent, mantissa := stepOf(aim / angle)
	// The largest such number that is not above, where stepOf gives the
	// smallest that is not below.
	if k := shifted(mantissa, exponent); k > aim/angle*(1+alike) {
		switch mantissa {
		case 1:
			return shifted(5, exponent-1)
		case 2:
			return shifted(1, exponent)
		default:
			return shifted(2, exponent)
		}
	}
	return shifted(mantissa, exponent)
}

// largestAngle bounds the angles, or strains, that a block is drawn for.
const largestAngle = 1000

// shearAngle draws a block sheared by an angle.
func (s *sketch) shearAngle() *Drawing {
	const title = "Block in shear"
	if why := s.finite("gamma"); why != "" {
		return s.refuse(why, title)
	}
	if math.Abs(s.arg("gamma").x) > largestAngle {
		return s.refuse(fmt.Sprintf("not drawn: %s is no angle of a block", plainOf(equals(s.symbolOf("gamma"), s.valueOf("gamma")))), title)
	}
	const width, height, gap = 120.0, 84.0, 6.0
	gamma := s.arg("gamma").x
	k := exaggeration(gamma)
	drawn := gamma * k
	if math.Abs(gamma) <= vanishing {
		drawn = 0
	}
	shift := height * math.Tan(drawn)
	sheared := []Point{{0, 0}, {width, 0}, {width + shift, -height}, {shift, -height}}
	s.fill(wash, sheared...)
	if drawn != 0 {
		s.polygon(hidden, box(0, -height, width, height)...)
	}
	s.polygon(outline, sheared...)
	s.hatch(stroke{soft, 0.4, nil}, 4, box(-8, 0, width+16, 7)...)
	s.line(axisLine, Point{-8, 0}, Point{width + 8, 0})
	if drawn != 0 {
		way := math.Copysign(1, drawn)
		shear := stroke{teal, firm, nil}
		middle := width/2 + shift
		s.arrow(shear, Point{middle - way*34, -height - gap}, Point{middle + way*34, -height - gap})
		radius := 0.62 * height
		s.arc(stroke{teal, 0.8, nil}, Point{}, radius, math.Pi/2, -drawn)
		if radius*math.Abs(drawn) > 8 {
			end := Point{}.toward(math.Pi/2-drawn, radius)
			sin, cos := math.Sincos(drawn)
			s.head(teal, end, way*cos, way*sin, 5)
		}
	}
	s.near(s.given("gamma").in(teal), Point{}.toward(math.Pi/2-drawn/2, 0.62*height), 4, everywhere, math.Pi/2-drawn/2, 0)
	factor := "the angle is drawn to scale"
	switch {
	case drawn == 0:
		factor = "the block is not sheared"
	case k != 1:
		factor = fmt.Sprintf("the angle is drawn %s times as large as it is", plainOf(s.factor(k)))
	}
	s.notes = append(s.notes, factor)
	return s.done(title)
}

func (s *sketch) factor(k float64) maths.Node {
	if k >= 1e6 || k < 1e-3 {
		exponent := int(math.Round(math.Floor(math.Log10(k) + alike)))
		return maths.Number{Value: fmt.Sprintf("%.0fe%d", shifted(k, -exponent), exponent)}
	}
	return maths.Number{Value: fmt.Sprintf("%g", k)}
}

// The field of a curve of stress and strain.
const (
	strainWidth  = 232.0
	strainHeight = 150.0
)

// stressStrain draws an elastic-plastic curve with the point where the part is.
func (s *sketch) stressStrain() *Drawing {
	const title = "Stress and strain in shear"
	if why := s.sizes("G", "tau_y"); why != "" {
		return s.refuse(why, title)
	}
	if why := s.finite("gamma"); why != "" {
		return s.refuse(why, title)
	}
	g, yield, gamma := s.arg("G").x, s.arg("tau_y").x, s.arg("gamma").x
	atYield := yield / g
	response := func(x float64) float64 { return math.Copysign(math.Min(math.Abs(x)*g, yield), x) }
	far := math.Max(2*atYield, 1.2*math.Abs(gamma))
	strain, stress := s.arg("gamma").step.Unit, s.arg("tau_y").step.Unit
	low := 0.0
	if gamma < 0 {
		low = -far
	}
	a := &axes{width: strainWidth, height: strainHeight}
	a.x = newScale([2]float64{strain.FromSI(low), strain.FromSI(far)}, false, 6)
	a.y = newScale([2]float64{stress.FromSI(response(low)), stress.FromSI(1.12 * yield)}, false, 6)
	at := func(x, y float64) Point { return a.point(strain.FromSI(x), stress.FromSI(y)) }
	s.frame(a, s.axisTitle([]maths.Node{s.symbolOf("gamma")}, strain, a.x.power), s.axisTitle([]maths.Node{s.name("τ")}, stress, a.y.power))
	points := []Point{at(0, 0), at(atYield, yield), at(far, yield)}
	if low < 0 {
		points = append([]Point{at(-far, -yield), at(-atYield, -yield)}, points...)
	}
	s.line(stroke{ink, heavy, nil}, points...)
	s.line(hidden, at(atYield, yield), at(atYield, 0))
	s.line(hidden, at(0, yield), at(atYield, yield))
	here := at(gamma, response(gamma))
	s.line(stroke{soft, 0.6, []float64{1.2, 1.8}}, here, at(gamma, 0))
	s.dot(here)
	strained := maths.Row{equals(s.symbolOf("gamma"), heavily(s.valueOf("gamma"))), maths.Comma}
	state := stack(s.label(strained), s.result(s.name("τ"), s.like("tau_y", response(gamma))))
	s.near(state, here, 5, a.field(), -math.Pi/4, -3*math.Pi/4, math.Pi/4, 3*math.Pi/4)
	s.near(s.given("tau_y"), at(far, yield), 4, a.field(), 3*math.Pi/4, -3*math.Pi/4)
	s.near(s.label(equals(s.name("γ_y"), s.like("gamma", atYield))), at(atYield, 0).plus(0, -9), 3, a.field(), 0, math.Pi)
	s.near(s.given("G"), at(0.5*atYield, 0.5*yield), 4, a.field(), -math.Pi/4, 3*math.Pi/4)
	behaviour := "the part is elastic"
	if math.Abs(gamma) > atYield*(1+alike) {
		behaviour = "the part has yielded"
	}
	s.notes = append(s.notes, behaviour)
	return s.done(title, fmt.Sprintf("The curve rises to %s at the strain %s and stays there.", plainOf(s.valueOf("tau_y")), plainOf(s.like("gamma", atYield))))
}
