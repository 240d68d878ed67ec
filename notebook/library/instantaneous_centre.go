package library

import (
	"errors"
	"math"
)

// The ultimate strength of an eccentric bolt group after Crawford & Kulak. The plate moves as a
// rigid body: the centroid by (a_x, a_y) and a turn omega, so that a bolt at (u, v) from the centroid
// moves by d = (a_x - omega·v, a_y + omega·u). A bolt's force points along its own movement and grows
// with it. Forces and moment must be parallel to the load; only the ratio of the three movements counts, so the
// movement is a point q = (a_x, a_y, omega·r) on the unit sphere, r being the group's radius of
// gyration. With it the elastic solution is q parallel to the load (P_x, P_y, M/r), where Newton's
// method starts. A load through the centroid (omega = 0, a centre at infinity) is a point like any other.

// icDeformation is the exponent at the bolt that moves most: 10 for each inch, times 0.34 in.
const icDeformation = 10 * 0.34

// boltForce is a bolt's force as part of its ultimate strength, from its movement as part of the largest.
func boltForce(movement float64) float64 {
	return math.Pow(-math.Expm1(-icDeformation*movement), 0.55)
}

type boltGroup struct {
	u, v []float64 // positions from the centroid, over r
	load vec3      // direction of (P_x, P_y, M/r), of length 1
}

// forces returns the sum of the bolts' forces and their moment over r for a movement.
func (g *boltGroup) forces(q vec3) vec3 {
	largest := g.largest(q)
	var sum vec3
	for i, u := range g.u {
		v := g.v[i]
		dx, dy := q[0]-q[2]*v, q[1]+q[2]*u
		d := math.Hypot(dx, dy)
		if d == 0 {
			continue // a bolt at the centre itself
		}
		f := boltForce(d/largest) / d
		sum = sum.plus(1, vec3{f * dx, f * dy, f * (u*dy - v*dx)})
	}
	return sum
}

// largest returns the movement of the bolt that moves most.
func (g *boltGroup) largest(q vec3) float64 {
	largest := 0.0
	for i, u := range g.u {
		largest = math.Max(largest, math.Hypot(q[0]-q[2]*g.v[i], q[1]+q[2]*u))
	}
	return largest
}

const (
	icSteps     = 200
	icTolerance = 1e-12 // on the part of the forces that is not along the load, over the lesser of force and moment
	icRounding  = 1e-15 // what that part cannot be told from 0 by
	icFarthest  = 1e6   // times the radius of gyration, beyond which the sum of the forces drowns in its terms
	icAccepted  = 1e-7  // over the force: a bolt at the centre itself answers a last bit of its movement by some 1e-9
)

var errNoCentre = errors.New("the search for the instantaneous centre did not converge")

// movement searches the movement whose forces are along the load.
func (g *boltGroup) movement() (vec3, error) {
	force, moment := math.Hypot(g.load[0], g.load[1]), math.Abs(g.load[2])
	tolerance := max(icTolerance*min(force, moment), icRounding)
	q := g.load
	miss := g.miss(q)
	for range icSteps {
		if miss.norm() <= tolerance {
			break
		}
		step, ok := g.newton(q, miss)
		if !ok {
			return vec3{}, errNoCentre
		}
		moved := false
		for scale := 1.0; scale > 1e-12; scale /= 2 {
			trial := q.plus(scale, step).unit()
			if m := g.miss(trial); m.norm() < miss.norm() {
				q, miss, moved = trial, m, true
				break
			}
		}
		if !moved {
			break
		}
	}
	if miss.norm() > icAccepted*force {
		return vec3{}, errNoCentre
	}
	return g.settled(q, max(miss.norm(), tolerance)), nil
}

// settled takes out the movements that the balance does not need, a symmetrical group's dust of the search: they
// would be read as movements.
func (g *boltGroup) settled(q vec3, tolerance float64) vec3 {
	for i := range q {
		without := q
		without[i] = 0
		if without.norm() > 0 && g.miss(without).norm() <= tolerance {
			q = without
		}
	}
	return q
}

// miss is the part of the forces that is not along the load, as part of them.
func (g *boltGroup) miss(q vec3) vec3 {
	f := g.forces(q).unit()
	along := f.dot(g.load)
	if along <= 0 {
		return vec3{2} // forces against the load: worse than any other
	}
	return f.plus(-along, g.load)
}

// newton returns the step on the sphere that takes the miss to 0 in the linear range.
func (g *boltGroup) newton(q, miss vec3) (vec3, bool) {
	const h = 1e-7
	q1, q2 := q.normals()
	p1, p2 := g.load.normals()
	d1 := g.miss(q.plus(h, q1).unit()).plus(-1, g.miss(q.plus(-h, q1).unit()))
	d2 := g.miss(q.plus(h, q2).unit()).plus(-1, g.miss(q.plus(-h, q2).unit()))
	a, b := d1.dot(p1)/(2*h), d2.dot(p1)/(2*h)
	c, d := d1.dot(p2)/(2*h), d2.dot(p2)/(2*h)
	det := a*d - b*c
	if det == 0 || math.IsNaN(det) {
		return vec3{}, false
	}
	m1, m2 := miss.dot(p1), miss.dot(p2)
	var step vec3
	return step.plus(-(d*m1-b*m2)/det, q1).plus(-(a*m2-c*m1)/det, q2), true
}

// vec3 is a vector of three components.
type vec3 [3]float64

func (a vec3) plus(scale float64, b vec3) vec3 {
	return vec3{a[0] + scale*b[0], a[1] + scale*b[1], a[2] + scale*b[2]}
}

func (a vec3) dot(b vec3) float64 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }

func (a vec3) norm() float64 { return math.Sqrt(a.dot(a)) }

func (a vec3) unit() vec3 {
	n := a.norm()
	if n == 0 {
		return a
	}
	return vec3{a[0] / n, a[1] / n, a[2] / n}
}

// normals returns two vectors that are square to a unit vector and to each other.
func (a vec3) normals() (vec3, vec3) {
	b := vec3{1, 0, 0}
	if math.Abs(a[0]) > 0.6 {
		b = vec3{0, 1, 0}
	}
	b = b.plus(-b.dot(a), a).unit()
	return b, vec3{a[1]*b[2] - a[2]*b[1], a[2]*b[0] - a[0]*b[2], a[0]*b[1] - a[1]*b[0]}
}
