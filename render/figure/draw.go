// Package figure draws the plots and the sketches of a calc.
//
// Plot, Bars and Sketch turn computed values into a Drawing: paths and texts
// placed on a rectangle, lengths in points. A drawing knows nothing of pages;
// SVG writes it for a web page, and the PDF writer walks over its items, so
// that both show the same ink.
//
//	d := figure.Sketch(block.Figure)
//	page = d.SVG(page, "figure-1")
//
// Drawings keep to one hand: everything is said by line, dash and word, and
// colour only repeats it, so that a copy in black and white loses nothing.
package figure

import (
	"math"
	"slices"

	"gusset/render/fonts"
	"gusset/render/maths"
)

// Drawing is a plot or a sketch. The origin is its upper left corner, x to the
// right and y down. A drawing never changes.
type Drawing struct {
	Width, Height float64
	Title, Desc   string // what it is, and what it shows, for those who cannot see it
	Items         []Item // in the order in which they cover each other
}

// Item is a path or a text.
type Item struct {
	Path   []Segment
	Stroke float64   // the width of the path's line; 0 where the path is filled
	Dash   []float64 // lengths of dashes and gaps in turn, none for a line drawn through
	Text   []Run     // set where there is no path: the runs of one label
	Colour Colour
}

// Segment is a part of a path.
type Segment struct {
	Kind   SegmentKind
	C1, C2 Point // the control points of a curve
	P      Point // where it ends; of no meaning for Close
}

// SegmentKind is the kind of a segment.
type SegmentKind uint8

// The segments: Curve is a cubic Bézier.
const (
	Move SegmentKind = iota
	Line
	Curve
	Close
)

// Point is a place of a drawing.
type Point struct{ X, Y float64 }

// Run is a piece of text in one face, its baseline starting at X, Y.
type Run struct {
	X, Y, Width float64
	Face        *fonts.Face
	Size        float64
	Text        string
}

// Colour is a colour as 0xRRGGBB.
type Colour uint32

// The colours of the page.
const (
	ink   Colour = 0x16202C
	soft  Colour = 0x5B6876
	teal  Colour = 0x0D5C75
	hair  Colour = 0xCFD6DD
	wash  Colour = 0xF3F6F8
	green Colour = 0x2E6B45
	red   Colour = 0xB3261E
	white Colour = 0xFFFFFF
)

// column is the width that a drawing has on the page: that of the calculation
// on A4. One that cannot do with it is made smaller as a whole.
const column = 334

// The widths of lines.
const (
	heavy = 1.3
	firm  = 0.9
	thin  = 0.5
)

// pad is a drawing in the making. Places are points anywhere in the plane, y
// down; finish moves all of it into the drawing's rectangle.
type pad struct {
	items   []Item
	maths   *maths.Builder
	lines   []span    // the strokes that labels keep clear of
	labels  []rect    // the labels and other things that they must not cover
	dots    []Point   // the values marked on curves
	waiting []waiting // the labels that are put when all strokes are known
	notes   []string
}

func newPad() *pad { return &pad{maths: maths.NewBuilder()} }

// span is a straight stroke.
type span struct{ a, b Point }

func (p Point) plus(dx, dy float64) Point { return Point{p.X + dx, p.Y + dy} }

// toward is the point at a distance along a direction in radians, angles
// growing counter-clockwise as an engineer draws them.
func (p Point) toward(angle, distance float64) Point {
	sin, cos := math.Sincos(angle)
	return Point{p.X + distance*cos, p.Y - distance*sin}
}

// stroke is a kind of line.
type stroke struct {
	colour Colour
	width  float64
	dash   []float64
}

// The lines of sketches.
var (
	outline  = stroke{ink, firm, nil}
	fine     = stroke{soft, thin, nil}
	axisLine = stroke{ink, 0.7, nil}
	centre   = stroke{soft, thin, []float64{7, 2, 1.5, 2}}
	hidden   = stroke{soft, 0.6, []float64{3, 2}}
	plane    = stroke{red, heavy, []float64{6, 2.2}}
)

func polyline(points []Point, closed bool) []Segment {
	path := make([]Segment, 0, len(points)+1)
	for i, q := range points {
		kind := Line
		if i == 0 {
			kind = Move
		}
		path = append(path, Segment{Kind: kind, P: q})
	}
	if closed {
		path = append(path, Segment{Kind: Close})
	}
	return path
}

// line draws straight strokes from point to point.
func (d *pad) line(s stroke, points ...Point) {
	d.faint(s, points...)
	for i := 1; i < len(points); i++ {
		d.lines = append(d.lines, span{points[i-1], points[i]})
	}
}

// faint draws strokes that a label may stand on.
func (d *pad) faint(s stroke, points ...Point) {
	if len(points) > 1 {
		d.items = append(d.items, Item{Path: polyline(points, false), Stroke: s.width, Dash: s.dash, Colour: s.colour})
	}
}

// polygon draws a closed outline.
func (d *pad) polygon(s stroke, points ...Point) {
	d.items = append(d.items, Item{Path: polyline(points, true), Stroke: s.width, Dash: s.dash, Colour: s.colour})
	for i := range points {
		d.lines = append(d.lines, span{points[i], points[(i+1)%len(points)]})
	}
}

func (d *pad) fill(c Colour, points ...Point) {
	d.items = append(d.items, Item{Path: polyline(points, true), Colour: c})
}

// box are the corners of a rectangle.
func box(x, y, w, h float64) []Point {
	return []Point{{x, y}, {x + w, y}, {x + w, y + h}, {x, y + h}}
}

// arcPath is an arc about a centre, from one angle through a sweep (positive
// counter-clockwise), as cubic curves of a quarter turn at most.
func arcPath(c Point, r, from, sweep float64) []Segment {
	n := max(1, int(math.Ceil(math.Abs(sweep)/(math.Pi/2)-1e-9)))
	step := sweep / float64(n)
	reach := 4.0 / 3 * math.Tan(step/4) * r
	path := []Segment{{Kind: Move, P: c.toward(from, r)}}
	for i := range n {
		a, b := from+float64(i)*step, from+float64(i+1)*step
		start, end := c.toward(a, r), c.toward(b, r)
		path = append(path, Segment{Kind: Curve,
			C1: start.toward(a+math.Pi/2, reach), C2: end.toward(b-math.Pi/2, reach), P: end})
	}
	return path
}

// arc draws an arc.
func (d *pad) arc(s stroke, c Point, r, from, sweep float64) {
	d.items = append(d.items, Item{Path: arcPath(c, r, from, sweep), Stroke: s.width, Dash: s.dash, Colour: s.colour})
	const chords = 24
	n := max(2, int(chords*math.Abs(sweep)/math.Pi))
	for i := range n {
		d.lines = append(d.lines, span{c.toward(from+sweep*float64(i)/float64(n), r), c.toward(from+sweep*float64(i+1)/float64(n), r)})
	}
}

func (d *pad) circle(s stroke, c Point, r float64) { d.arc(s, c, r, 0, 2*math.Pi) }

// disc fills a circle.
func (d *pad) disc(colour Colour, c Point, r float64) {
	d.items = append(d.items, Item{Path: append(arcPath(c, r, 0, 2*math.Pi), Segment{Kind: Close}), Colour: colour})
}

// dot marks a point of a curve.
func (d *pad) dot(c Point) {
	d.disc(white, c, 3.2)
	d.disc(ink, c, 2.3)
	d.dots = append(d.dots, c)
	d.labels = append(d.labels, rect{c.X - 3, c.Y - 3, c.X + 3, c.Y + 3})
}

// arrow draws a line with a head at its end.
func (d *pad) arrow(s stroke, from, to Point) {
	length := math.Hypot(to.X-from.X, to.Y-from.Y)
	if length == 0 {
		return
	}
	head := math.Min(4+3*s.width, 0.6*length)
	ux, uy := (to.X-from.X)/length, (to.Y-from.Y)/length
	d.line(s, from, to.plus(-0.8*head*ux, -0.8*head*uy))
	d.head(s.colour, to, ux, uy, head)
	d.lines = append(d.lines, span{from, to})
}

// head fills an arrowhead whose point is at p, in the direction u.
func (d *pad) head(c Colour, p Point, ux, uy, length float64) {
	back, half := p.plus(-length*ux, -length*uy), 0.3*length
	d.fill(c, p, back.plus(-half*uy, half*ux), back.plus(half*uy, -half*ux))
}

// hatch fills a polygon with slanting strokes.
func (d *pad) hatch(s stroke, apart float64, polygon ...Point) {
	// Strokes run where x + y is a multiple of the distance, so that neighbours
	// line up.
	apart *= math.Sqrt2
	low, high := math.Inf(1), math.Inf(-1)
	for _, p := range polygon {
		low, high = math.Min(low, p.X+p.Y), math.Max(high, p.X+p.Y)
	}
	const most = 2000
	if !(high-low < most*apart) {
		return
	}
	for c := math.Ceil(low/apart) * apart; c < high; c += apart {
		var cuts []float64 // x of the crossings
		for i, a := range polygon {
			b := polygon[(i+1)%len(polygon)]
			fa, fb := a.X+a.Y-c, b.X+b.Y-c
			if (fa < 0) != (fb < 0) {
				cuts = append(cuts, a.X+(b.X-a.X)*fa/(fa-fb))
			}
		}
		slices.Sort(cuts)
		for i := 0; i+1 < len(cuts); i += 2 {
			if cuts[i+1]-cuts[i] > 0.1 {
				d.faint(s, Point{cuts[i], c - cuts[i]}, Point{cuts[i+1], c - cuts[i+1]})
			}
		}
	}
}

// round is a circle as a polygon, for hatching.
func round(c Point, r float64) []Point {
	points := make([]Point, 72)
	for i := range points {
		points[i] = c.toward(2*math.Pi*float64(i)/float64(len(points)), r)
	}
	return points
}

// extent is what all items cover.
func (d *pad) extent() rect {
	out := nowhere
	for i := range d.items {
		out = out.and(d.items[i].extent())
	}
	return out
}

func (it *Item) extent() rect {
	out := nowhere
	for _, s := range it.Path {
		if s.Kind == Close {
			continue
		}
		out = out.reach(s.P)
		if s.Kind == Curve {
			out = out.reach(s.C1).reach(s.C2)
		}
	}
	if it.Path != nil {
		return out.grown(it.Stroke / 2)
	}
	for _, r := range it.Text {
		out = out.and(rect{r.X, r.Y - ascent*r.Size, r.X + r.Width, r.Y + descent*r.Size})
	}
	return out
}

// finish moves everything into a rectangle that holds all of it, its notes
// below, no wider than the column.
func (d *pad) finish(title, desc string) *Drawing {
	const edge = 1.5
	d.settle()
	room := d.extent()
	if room.empty() {
		room = rect{0, 0, column, 0}
	}
	y := room.y1 + 4
	for _, n := range d.notes {
		for _, l := range d.wrap(n, fonts.Sans, noteSize, math.Max(room.x1-room.x0, column-4)) {
			y += 1.35 * noteSize
			d.put(l.in(soft), Point{room.x0, y})
		}
	}
	room = d.extent()
	if room.empty() {
		room = rect{0, 0, column, 0}
	}
	k := math.Min(1, (column-2*edge)/(room.x1-room.x0))
	for i := range d.items {
		d.items[i].moveTo(k, edge-k*room.x0, edge-k*room.y0)
	}
	return &Drawing{
		Width: k*(room.x1-room.x0) + 2*edge, Height: k*(room.y1-room.y0) + 2*edge,
		Title: title, Desc: desc, Items: d.items,
	}
}

// moveTo scales an item and then moves it.
func (it *Item) moveTo(k, dx, dy float64) {
	at := func(p Point) Point { return Point{k*p.X + dx, k*p.Y + dy} }
	for i := range it.Path {
		s := &it.Path[i]
		s.C1, s.C2, s.P = at(s.C1), at(s.C2), at(s.P)
	}
	for i := range it.Text {
		r := &it.Text[i]
		r.X, r.Y, r.Width, r.Size = k*r.X+dx, k*r.Y+dy, k*r.Width, k*r.Size
	}
	it.Stroke *= k
	if k != 1 && it.Dash != nil {
		dash := make([]float64, len(it.Dash))
		for i, l := range it.Dash {
			dash[i] = k * l
		}
		it.Dash = dash
	}
}
