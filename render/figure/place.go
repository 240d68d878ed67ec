package figure

import "math"

// rect is a place that something covers.
type rect struct{ x0, y0, x1, y1 float64 }

// nowhere covers nothing.
var nowhere = rect{math.Inf(1), math.Inf(1), math.Inf(-1), math.Inf(-1)}

func (r rect) empty() bool { return !(r.x0 <= r.x1 && r.y0 <= r.y1) }

func (r rect) and(o rect) rect {
	return rect{math.Min(r.x0, o.x0), math.Min(r.y0, o.y0), math.Max(r.x1, o.x1), math.Max(r.y1, o.y1)}
}

func (r rect) reach(p Point) rect { return r.and(rect{p.X, p.Y, p.X, p.Y}) }

func (r rect) grown(by float64) rect { return rect{r.x0 - by, r.y0 - by, r.x1 + by, r.y1 + by} }

// shared is the area that two rectangles both cover.
func (r rect) shared(o rect) float64 {
	w := math.Min(r.x1, o.x1) - math.Max(r.x0, o.x0)
	h := math.Min(r.y1, o.y1) - math.Max(r.y0, o.y0)
	if w <= 0 || h <= 0 {
		return 0
	}
	return w * h
}

// inside is the length of a stroke that lies in the rectangle (Liang and
// Barsky 1984).
func (r rect) inside(s span) float64 {
	dx, dy := s.b.X-s.a.X, s.b.Y-s.a.Y
	from, to := 0.0, 1.0
	for _, edge := range [4][2]float64{{-dx, s.a.X - r.x0}, {dx, r.x1 - s.a.X}, {-dy, s.a.Y - r.y0}, {dy, r.y1 - s.a.Y}} {
		p, q := edge[0], edge[1]
		if p == 0 {
			if q < 0 {
				return 0
			}
			continue
		}
		if t := q / p; p < 0 {
			from = math.Max(from, t)
		} else {
			to = math.Min(to, t)
		}
	}
	if from >= to {
		return 0
	}
	return (to - from) * math.Hypot(dx, dy)
}

// trouble is how much a label in a rectangle would cover or be crossed by; 0 is
// a free place. Other labels weigh more than lines. It need not be known beyond
// a bound.
func (d *pad) trouble(r, within rect, bound float64) float64 {
	r = r.grown(1.8)
	area := (r.x1 - r.x0) * (r.y1 - r.y0)
	sum := 8 * (area - r.shared(within))
	for _, o := range d.labels {
		sum += 4 * r.shared(o)
	}
	for i := 0; i < len(d.lines) && sum < bound; i++ {
		s := &d.lines[i]
		if max(s.a.X, s.b.X) >= r.x0 && min(s.a.X, s.b.X) <= r.x1 && max(s.a.Y, s.b.Y) >= r.y0 && min(s.a.Y, s.b.Y) <= r.y1 {
			sum += 3 * r.inside(*s)
		}
	}
	return sum
}

// everywhere is no bound on where a label may stand.
var everywhere = rect{-1e9, -1e9, 1e9, 1e9}

// leaderFrom is how far beyond its gap a label gets a line to its point.
const leaderFrom = 9

// crossed is how much a line from a label to its point would cross other
// labels.
func (d *pad) crossed(leader span) float64 {
	sum := 0.0
	for _, o := range d.labels {
		if o.distance(leader.a) > 0 {
			sum += 3 * o.inside(leader)
		}
	}
	return sum
}

// near puts a label at the freest place about a point: by the first of the
// directions if that is free, else round it and further out. A label that
// had to go far gets a thin line to its point. The places tried lie within a
// rectangle.
func (d *pad) near(l label, p Point, gap float64, within rect, directions ...float64) {
	best, least := Point{}, math.Inf(1)
	for ring, out := range []float64{gap, gap + 5, gap + 11, gap + 18, gap + 27, gap + 38} {
		for i := range len(directions) + 24 {
			angle := 0.0
			if i < len(directions) {
				angle = directions[i]
			} else {
				// Further places fan out from the first direction to both sides.
				turn := float64((i-len(directions))/2+1) * math.Pi / 12
				if i%2 == 1 {
					turn = -turn
				}
				if len(directions) > 0 {
					angle = directions[0]
				}
				angle += turn
			}
			at := l.beside(p, angle, out)
			t := d.trouble(l.rect(at), within, least) + 0.6*float64(ring)
			if r := l.rect(at); t < least && r.distance(p) > gap+leaderFrom {
				t += d.crossed(span{p, r.nearest(p)})
			}
			if t < least-1e-9 {
				best, least = at, t
			}
		}
		if least < 0.6*float64(ring+1) {
			break
		}
	}
	r := l.rect(best)
	if r.distance(p) > gap+leaderFrom {
		d.line(fine, p, r.nearest(p))
	}
	d.fill(white, box(r.x0+0.5, r.y0+1, r.x1-r.x0-1, r.y1-r.y0-2)...)
	d.put(l, best)
}

// beside is where the baseline of a label starts that stands beside a point in
// a direction, at a distance from it.
func (l label) beside(p Point, angle, distance float64) Point {
	q := p.toward(angle, distance)
	sin, cos := math.Sincos(angle)
	w, h := l.set.Width, l.above()+l.below()
	// Straight out it is the middle of the label's side that stands there, and
	// slantwise its corner.
	side := func(share float64) float64 { return math.Max(-1, math.Min(1, 1.5*share)) / 2 }
	return Point{q.X - w/2 + side(cos)*w, q.Y - h/2 - side(sin)*h + l.above()}
}

// nearest is the point of a rectangle closest to a point.
func (r rect) nearest(p Point) Point {
	return Point{math.Min(math.Max(p.X, r.x0), r.x1), math.Min(math.Max(p.Y, r.y0), r.y1)}
}

func (r rect) distance(p Point) float64 {
	q := r.nearest(p)
	return math.Hypot(p.X-q.X, p.Y-q.Y)
}
