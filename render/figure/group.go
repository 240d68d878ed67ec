package figure

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/render/fonts"
	"gusset/render/maths"
)

// The measures of a group of fasteners.
const (
	groupWidth   = 150.0
	groupHeight  = 140.0
	longestForce = 46.0
	fastenerSize = 4.6 // radius of a fastener's circle
	mostDrawn    = 500 // fasteners
	mostMarked   = 40  // more are drawn without their marks
	mostForces   = 12  // more are drawn without their forces in figures
	mostStations = 7   // lines of fasteners with a dimension each
)

// fastener is one of a group, its place in the drawing.
type fastener struct {
	at     Point
	x, y   float64 // m
	fx, fy float64 // N
	force  float64
	mark   string
}

// group draws a group of fasteners with the forces on them, the one with the
// largest marked. Of forces over load cases it draws the case that has it.
func (s *sketch) group(f *eval.Figure) *Drawing {
	const title = "Fastener group"
	for i, a := range f.Args {
		s.args = append(s.args, arg{name: f.Names[i], step: a})
	}
	list, governs := s.fasteners(f)
	if len(list) == 0 {
		return s.refuse("not drawn: a position or a force has no value, or one out of the range of drawings", title)
	}
	s.place(list)
	largest := list[governs].force
	s.centroid(list)
	if n := len(list); n > mostDrawn {
		s.notes = append(s.notes, fmt.Sprintf("the first %d of %d fasteners are drawn, and the governing one", mostDrawn, n))
	}
	// The room that the arrows take is known before the dimensions are placed.
	tips := nowhere
	for i := range list {
		if i < mostDrawn || i == governs {
			s.fastener(&list[i], i == governs && largest > 0)
			tip := list[i].tip(largest)
			s.arrowTo(&list[i], tip, i == governs)
			tips = tips.reach(tip).and(rect{list[i].at.X, list[i].at.Y, list[i].at.X, list[i].at.Y}.grown(fastenerSize))
		}
	}
	s.groupDimensions(list, tips)
	s.groupLabels(list, governs, largest)
	s.tripod(Point{tips.x0 - 62, tips.y1 + 40})
	g := list[governs]
	sentence := fmt.Sprintf("%d fasteners.", len(list))
	if largest > 0 {
		sentence += fmt.Sprintf(" The largest force is %s on %s.", plainOf(s.forceOf(g.force)), g.mark)
	} else {
		s.notes = append(s.notes, "no fastener carries a force")
	}
	if s.mark != "" {
		s.notes = append(s.notes, "forces of "+s.mark+", which governs")
	}
	return s.finish(title, s.described([]string{sentence}))
}

// fasteners are the members of the group with the forces of the entry that
// has the largest; none where a value is missing.
func (s *sketch) fasteners(f *eval.Figure) (list []fastener, governs int) {
	joint := jointType(f)
	if len(f.Args) < 4 || slices.Contains(f.Args, nil) || len(f.Args[0].Value.Type.Rows) != 1 {
		return nil, 0
	}
	force := func(e int) (fx, fy float64) { return valueAt(f.Args[2], joint, e), valueAt(f.Args[3], joint, e) }
	best, most := 0, -1.0
	for e := range joint.Count() {
		fx, fy := force(e)
		if h := math.Hypot(fx, fy); h > most {
			best, most = e, h
		}
	}
	rows := f.Args[0].Value.Type.Rows[0]
	own := check.Type{Rows: []*check.Rows{rows}}
	for i := range rows.N() {
		e := with(joint, best, rows, i)
		m := fastener{x: valueAt(f.Args[0], joint, e), y: valueAt(f.Args[1], joint, e), mark: rows.Marks[i]}
		m.fx, m.fy = force(e)
		m.force = math.Hypot(m.fx, m.fy)
		for _, v := range []float64{m.x, m.y, m.force} {
			if !drawable(v) {
				return nil, 0
			}
		}
		list = append(list, m)
	}
	governs = max(joint.Project(best, own), 0)
	others := check.Type{}
	for _, r := range joint.Rows {
		if r != rows {
			others.Rows = append(others.Rows, r)
		}
	}
	if len(others.Rows) > 0 {
		s.mark = others.Mark(max(joint.Project(best, others), 0))
	}
	return list, governs
}

// with is the entry that differs from another only in the row of one set.
func with(t check.Type, e int, rows *check.Rows, row int) int {
	at := make([]int, len(t.Rows))
	for i := len(t.Rows) - 1; i >= 0; i-- {
		n := t.Rows[i].N()
		at[i] = e % n
		e /= n
	}
	out := 0
	for i, r := range t.Rows {
		if r == rows {
			at[i] = row
		}
		out = out*r.N() + at[i]
	}
	return out
}

// place puts the fasteners to scale, the group's first corner at the origin.
func (s *sketch) place(list []fastener) {
	x0, x1, y0, y1 := spread(list)
	k := math.Min(groupWidth/(x1-x0), groupHeight/(y1-y0))
	if math.IsInf(k, 0) || math.IsNaN(k) {
		k = 0
	}
	for i := range list {
		list[i].at = Point{k * (list[i].x - x0), -k * (list[i].y - y0)}
	}
}

func spread(list []fastener) (x0, x1, y0, y1 float64) {
	x0, x1, y0, y1 = list[0].x, list[0].x, list[0].y, list[0].y
	for _, m := range list {
		x0, x1 = math.Min(x0, m.x), math.Max(x1, m.x)
		y0, y1 = math.Min(y0, m.y), math.Max(y1, m.y)
	}
	return x0, x1, y0, y1
}

// centroid marks the middle of the fasteners.
func (s *sketch) centroid(list []fastener) {
	var c Point
	for _, m := range list {
		c.X += m.at.X / float64(len(list))
		c.Y += m.at.Y / float64(len(list))
	}
	const arm = 5.0
	s.line(stroke{soft, 0.7, nil}, c.plus(-arm, 0), c.plus(arm, 0))
	s.line(stroke{soft, 0.7, nil}, c.plus(0, -arm), c.plus(0, arm))
}

func (s *sketch) fastener(m *fastener, governs bool) {
	s.disc(white, m.at, fastenerSize)
	s.circle(stroke{ink, 0.8, nil}, m.at, fastenerSize)
	if governs {
		s.circle(stroke{red, heavy, nil}, m.at, fastenerSize+2.4)
	}
}

// tip is where the arrow of a force ends.
func (m *fastener) tip(largest float64) Point {
	if !(largest > 0) {
		return m.at
	}
	return m.at.plus(longestForce*(m.fx/largest), -longestForce*(m.fy/largest))
}

func (s *sketch) arrowTo(m *fastener, tip Point, governs bool) {
	line := stroke{ink, firm, nil}
	if governs {
		line = stroke{red, heavy, nil}
	}
	if math.Hypot(tip.X-m.at.X, tip.Y-m.at.Y) > 0.3 {
		s.arrow(line, m.at, tip)
	}
	s.disc(ink, m.at, 1.1)
}

func (s *sketch) forceOf(newtons float64) maths.Node { return s.like("F_x", newtons) }

// groupLabels names the fasteners, and prints the forces of a few.
func (s *sketch) groupLabels(list []fastener, governs int, largest float64) {
	one := func(i int) {
		m := &list[i]
		l := s.labelIn(maths.Text{Text: m.mark}, fonts.Sans, noteSize).in(soft)
		if i == governs && largest > 0 {
			l = s.labelIn(maths.Row{maths.Text{Text: m.mark}, maths.Op{Sign: ":", Class: maths.Punct}, s.forceOf(m.force)}, fonts.SansSemiBold, labelSize).in(red)
		} else if len(list) <= mostForces && largest > 0 {
			l = s.labelIn(maths.Row{maths.Text{Text: m.mark}, maths.Op{Sign: ":", Class: maths.Punct}, s.forceOf(m.force)}, fonts.Sans, noteSize)
		}
		// Away from the force.
		away := 3 * math.Pi / 4
		if m.force > 0 {
			away = math.Atan2(-m.fy, -m.fx)
		}
		s.near(l, m.at, fastenerSize+3.5, everywhere, away, 3*math.Pi/4, math.Pi/4, -math.Pi/4, -3*math.Pi/4)
	}
	one(governs)
	for i := range list {
		if i != governs && len(list) <= mostMarked {
			one(i)
		}
	}
}

// groupDimensions draws the distances between the lines of fasteners below
// and to the left, clear of the arrows; of many lines only from the first to
// the last.
func (s *sketch) groupDimensions(list []fastener, tips rect) {
	const clear = 16.0
	columns := stations(list, func(m fastener) (float64, float64) { return m.x, m.at.X })
	for i := 1; i < len(columns); i++ {
		a, b := columns[i-1], columns[i]
		s.dimension(Point{b.at, tips.y1 + 4}, Point{a.at, tips.y1 + 4}, clear, s.label(s.like("x", b.value-a.value)))
	}
	lines := stations(list, func(m fastener) (float64, float64) { return m.y, m.at.Y })
	for i := 1; i < len(lines); i++ {
		a, b := lines[i-1], lines[i]
		s.dimension(Point{tips.x0 - 4, a.at}, Point{tips.x0 - 4, b.at}, clear, s.label(s.like("y", b.value-a.value)))
	}
}

// station is a line of fasteners: its coordinate and its place in the drawing.
type station struct{ value, at float64 }

// stations are the lines of fasteners in one direction, in order.
func stations(list []fastener, of func(fastener) (value, at float64)) []station {
	var all []station
	for _, m := range list {
		value, at := of(m)
		all = append(all, station{value, at})
	}
	slices.SortFunc(all, func(a, b station) int { return cmp.Compare(a.value, b.value) })
	span := all[len(all)-1].value - all[0].value
	lines := all[:1:1]
	for _, st := range all[1:] {
		if st.value-lines[len(lines)-1].value > 1e-6*span {
			lines = append(lines, st)
		}
	}
	if len(lines) > mostStations {
		return []station{lines[0], lines[len(lines)-1]}
	}
	return lines
}
