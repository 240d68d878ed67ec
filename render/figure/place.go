package figure

import (
	"math"
	"slices"
)

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

// The room that a label keeps from strokes and from other labels. Above and
// below, its line of text has room of its own.
const (
	roomBeside = 3.5
	roomAbove  = 1.8
)

// waiting is a label that is put once all else is drawn.
type waiting struct {
	label      label
	point      Point
	gap        float64
	within     rect
	directions []float64
	alone      bool // it belongs to the whole drawing, and not to the point
}

// room is a label's rectangle with the room about it, to the sides no more
// than it is from its point.
func (w *waiting) room(r rect) rect {
	x := math.Min(roomBeside, w.gap-0.5)
	return rect{r.x0 - x, r.y0 - roomAbove, r.x1 + x, r.y1 + roomAbove}
}

// trouble is how much a label in a rectangle would cover or be crossed by; 0 is
// a free place. Other labels weigh more than lines, and a line through the
// label itself more than one that is only close. It need not be known beyond a
// bound.
func (d *pad) trouble(w *waiting, at rect, bound float64) float64 {
	const through = 25
	r := w.room(at)
	area := (r.x1 - r.x0) * (r.y1 - r.y0)
	sum := 8*(area-r.shared(w.within)) + d.mistaken(w, at)
	for _, o := range d.labels {
		if o.distance(w.point) == 0 {
			// The mark of its own point is as far as the gap says.
			sum += 4 * at.shared(o)
			continue
		}
		sum += 4 * r.shared(o)
	}
	for i := 0; i < len(d.lines) && sum < bound; i++ {
		s := &d.lines[i]
		if max(s.a.X, s.b.X) >= r.x0 && min(s.a.X, s.b.X) <= r.x1 && max(s.a.Y, s.b.Y) >= r.y0 && min(s.a.Y, s.b.Y) <= r.y1 {
			sum += 3 * r.inside(*s)
			if at.inside(*s) > 0 {
				sum += through
			}
		}
	}
	return sum
}

// mistaken is how much a label would be taken for that of another dot: it
// stands no nearer to its own, and no line leads to it.
func (d *pad) mistaken(w *waiting, at rect) float64 {
	own := at.distance(w.point)
	if own > w.gap+leaderFrom || !slices.Contains(d.dots, w.point) {
		return 0
	}
	for _, o := range d.dots {
		if o != w.point && at.distance(o) <= own {
			return 40
		}
	}
	return 0
}

// everywhere is no bound on where a label may stand.
var everywhere = rect{-1e9, -1e9, 1e9, 1e9}

// leaderFrom is how far beyond its gap a label gets a line to its point.
const leaderFrom = 9

// crossed is how much a line from a label's point to the label would cross
// labels and strokes. What runs through the point itself it cannot but touch.
func (d *pad) crossed(leader span) float64 {
	sum := 0.0
	for _, o := range d.labels {
		if o.distance(leader.a) > 0 && o.inside(leader) > 0 {
			sum += 25 + 3*o.inside(leader)
		}
	}
	for _, s := range d.lines {
		if leader.a.toSpan(s) > 1 && leader.crosses(s) {
			sum += 6
		}
	}
	return sum
}

// side is twice the area of the triangle of a stroke and a point, its sign
// telling on which side the point lies.
func (s span) side(p Point) float64 {
	return (s.b.X-s.a.X)*(p.Y-s.a.Y) - (s.b.Y-s.a.Y)*(p.X-s.a.X)
}

func (s span) crosses(o span) bool {
	return s.side(o.a)*s.side(o.b) < 0 && o.side(s.a)*o.side(s.b) < 0
}

// toSpan is how far a point lies from a stroke.
func (p Point) toSpan(s span) float64 {
	dx, dy := s.b.X-s.a.X, s.b.Y-s.a.Y
	along := 0.0
	if l := dx*dx + dy*dy; l > 0 {
		along = math.Max(0, math.Min(1, ((p.X-s.a.X)*dx+(p.Y-s.a.Y)*dy)/l))
	}
	return math.Hypot(p.X-s.a.X-along*dx, p.Y-s.a.Y-along*dy)
}

// near puts a label at the freest place about a point: by the first of the
// directions if that is free, else round it and further out. A label that
// had to go far gets a thin line to its point. The places tried lie within a
// rectangle. The label waits for all strokes, those drawn after it too.
func (d *pad) near(l label, p Point, gap float64, within rect, directions ...float64) {
	d.waiting = append(d.waiting, waiting{label: l, point: p, gap: gap, within: within, directions: directions})
}

// about is the same for a label that belongs to the whole drawing: no line
// leads to the point.
func (d *pad) about(l label, p Point, gap float64, directions ...float64) {
	d.waiting = append(d.waiting, waiting{label: l, point: p, gap: gap, within: everywhere, directions: directions, alone: true})
}

// settle puts the labels that wait, in the order in which they came.
func (d *pad) settle() {
	for i := range d.waiting {
		d.settleOne(&d.waiting[i])
	}
	d.waiting = nil
}

func (d *pad) settleOne(w *waiting) {
	l, p := w.label, w.point
	led := func(r rect) bool { return !w.alone && r.distance(p) > w.gap+leaderFrom }
	best, least := Point{}, math.Inf(1)
	for ring, out := range []float64{0, 5, 11, 18, 27, 38, 52} {
		for i := range len(w.directions) + 24 {
			at := l.beside(p, w.direction(i), w.gap+out)
			r := l.rect(at)
			t := d.trouble(w, r, least) + 0.6*float64(ring)
			if t < least && led(r) {
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
	if led(r) {
		d.line(fine, p, r.nearest(p))
	}
	d.fill(white, box(r.x0+0.5, r.y0+1, r.x1-r.x0-1, r.y1-r.y0-2)...)
	d.put(l, best)
}

// direction is the one of a number: those asked for come first, and further
// ones fan out from the first of them to both sides.
func (w *waiting) direction(i int) float64 {
	n := len(w.directions)
	if i < n {
		return w.directions[i]
	}
	turn := float64((i-n)/2+1) * math.Pi / 12
	if i%2 == 1 {
		turn = -turn
	}
	if n > 0 {
		turn += w.directions[0]
	}
	return turn
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
