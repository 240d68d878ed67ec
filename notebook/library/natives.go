package library

import (
	"errors"
	"math"

	"gonum.org/v1/gonum/mat"

	"gusset/notebook/check"
	"gusset/units"
)

// natives are what the library's helpers compute in Go, because it takes a search, a series or
// an eigenvalue. They are visible to the library's own files only.
var natives = []*check.Native{
	{Name: "saint_venant_k1", Params: plain(number), Result: number, F: scalars(saintVenantK1)},
	{Name: "saint_venant_k2", Params: plain(number), Result: number, F: scalars(saintVenantK2)},
	{Name: "saint_venant_rest", Params: plain(number), Result: number, F: scalars(saintVenantRest)},
	{Name: "principal_stress", Params: plain(number, stress, stress, stress, stress, stress, stress), Result: stress, F: principalStress},
	{Name: "ic_shift_x", Params: icParams, Result: number, F: icMovement(func(m icMotion) float64 { return m.shiftX })},
	{Name: "ic_shift_y", Params: icParams, Result: number, F: icMovement(func(m icMotion) float64 { return m.shiftY })},
	{Name: "ic_turn", Params: icParams, Result: perLength, F: icMovement(func(m icMotion) float64 { return m.turn })},
	{Name: "ic_x", Params: icParams, Result: length, F: icMovement(icMotion.x)},
	{Name: "ic_y", Params: icParams, Result: length, F: icMovement(icMotion.y)},
}

var (
	number    = units.Dimension{}
	length    = dimension("length")
	stress    = dimension("stress")
	perLength = reciprocal(length)

	icParams = []check.NativeParam{{Dim: length, Column: true}, {Dim: length, Column: true}, {Dim: length}, {Dim: number}}
)

// dimension is that of a named quantity. A name that does not exist is a fault of the program,
// found by the first test that runs.
func dimension(quantity string) units.Dimension {
	d, ok := units.QuantityByName(quantity)
	if !ok {
		panic("no quantity is called " + quantity)
	}
	return d
}

func reciprocal(d units.Dimension) units.Dimension {
	r, err := d.Pow(-1, 1)
	if err != nil {
		panic(err)
	}
	return r
}

func plain(dims ...units.Dimension) []check.NativeParam {
	params := make([]check.NativeParam, len(dims))
	for i, d := range dims {
		params[i].Dim = d
	}
	return params
}

func scalars(f func(float64) (float64, error)) func([][]float64) (float64, error) {
	return func(args [][]float64) (float64, error) { return f(args[0][0]) }
}

// The coefficients of a rectangular bar in torsion are Saint-Venant's series over n = 1, 3, 5, … for
// the ratio s >= 1 of its sides:
//
//	k_1 = (1 - 192/(pi^5·s)·sum tanh(n·pi·s/2)/n^5)/3
//	k_2 = k_1/(1 - 8/pi^2·sum 1/(n^2·cosh(n·pi·s/2)))
//
// The first converges like n^-5. With sum 1/n^5 = 31/32·zeta(5) known, only what tanh lacks of 1
// is left to add up, which dies out like exp(-n·pi·s): some twelve terms reach the last bit.
const (
	saintVenantTerms = 30
	zeta5            = 1.0369277551433699263
)

var errSides = errors.New("the longer side comes first: the ratio of the sides is at least 1")

func saintVenantK1(s float64) (float64, error) {
	if !(s >= 1-1e-9) {
		return 0, errSides
	}
	sum := zeta5 * 31 / 32
	for i := range saintVenantTerms {
		n := float64(2*i + 1)
		sum -= 2 / (math.Exp(n*math.Pi*s) + 1) / math.Pow(n, 5)
	}
	return (1 - 192/(math.Pow(math.Pi, 5)*s)*sum) / 3, nil
}

func saintVenantK2(s float64) (float64, error) {
	k1, err := saintVenantK1(s)
	if err != nil {
		return 0, err
	}
	sum := 0.0
	for i := range saintVenantTerms {
		n := float64(2*i + 1)
		sum += 1 / (n * n * math.Cosh(n*math.Pi*s/2))
	}
	return k1 / (1 - 8/(math.Pi*math.Pi)*sum), nil
}

// saintVenantRest bounds what the terms that are left out of either series would change in its
// coefficient, twice the first one since each is less than half of the one before, and the rounding of what is added up.
func saintVenantRest(s float64) (float64, error) {
	if !(s >= 1-1e-9) {
		return 0, errSides
	}
	n := float64(2*saintVenantTerms + 1)
	const rounding = 4.0 / (1 << 52)
	return max(rounding, 2*2*math.Exp(-n*math.Pi*s/2)/(n*n)), nil
}

// principalStress returns the k-th largest eigenvalue of the stress tensor.
func principalStress(args [][]float64) (float64, error) {
	k := int(args[0][0])
	if k < 1 || k > 3 {
		return 0, errors.New("a state of stress has three principal stresses")
	}
	x, y, z, xy, yz, zx := args[1][0], args[2][0], args[3][0], args[4][0], args[5][0], args[6][0]
	var eigen mat.EigenSym
	if !eigen.Factorize(mat.NewSymDense(3, []float64{x, xy, zx, xy, y, yz, zx, yz, z}), false) {
		return 0, errors.New("the search for the principal stresses did not converge")
	}
	ascending := eigen.Values(nil)
	return ascending[3-k], nil
}

// icMotion is the movement of a bolt group at ultimate: of its centroid and its turn, as parts
// of the movement of the bolt that moves most. turn is 0 where the load goes through the centroid.
type icMotion struct{ shiftX, shiftY, turn float64 }

// x is the coordinate of the instantaneous centre from the centroid; NaN where all bolts move alike.
func (m icMotion) x() float64 {
	if m.turn == 0 {
		return math.NaN()
	}
	return -m.shiftY / m.turn
}

func (m icMotion) y() float64 {
	if m.turn == 0 {
		return math.NaN()
	}
	return m.shiftX / m.turn
}

func icMovement(part func(icMotion) float64) func([][]float64) (float64, error) {
	return func(args [][]float64) (float64, error) {
		m, err := solveIC(args[0], args[1], args[2][0], args[3][0])
		if err != nil {
			return 0, err
		}
		return part(m), nil
	}
}

// solveIC finds the movement under a load at e from the centroid along +x that points along +y
// turned by theta. The positions u and v count from the centroid.
func solveIC(u, v []float64, e, theta float64) (icMotion, error) {
	if len(u) != len(v) {
		return icMotion{}, errors.New("each bolt needs both coordinates")
	}
	sum := 0.0
	for i := range u {
		sum += u[i]*u[i] + v[i]*v[i]
	}
	r := math.Sqrt(sum / float64(len(u)))
	arm := e * math.Cos(theta)
	if e == 0 || math.Abs(arm) <= 1e-12*r || math.Abs(math.Cos(theta)) <= 1e-12 {
		return icMotion{shiftX: -math.Sin(theta), shiftY: math.Cos(theta)}, nil
	}
	if r == 0 {
		return icMotion{}, errors.New("bolts in one place resist no moment")
	}
	if math.Abs(arm) > icFarthest*r {
		return icMotion{}, errors.New("the load stands over a million times the group's radius of gyration from its centroid, and rounding takes its force: for a moment alone, a nearer load will do")
	}
	g := &boltGroup{u: scaled(u, 1/r), v: scaled(v, 1/r)}
	g.load = vec3{-math.Sin(theta), math.Cos(theta), arm / r}.unit()
	q, err := g.movement()
	if err != nil {
		return icMotion{}, err
	}
	largest := g.largest(q)
	return icMotion{q[0] / largest, q[1] / largest, q[2] / largest / r}, nil
}

func scaled(list []float64, by float64) []float64 {
	out := make([]float64, len(list))
	for i, x := range list {
		out[i] = x * by
	}
	return out
}
