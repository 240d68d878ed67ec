package figure

import (
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

func TestNamesKeepApart(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 12).Draw(t, "n")
		want, room := make([]float64, n), make([]float64, n)
		total, at := 0.0, rapid.Float64Range(-50, 250).Draw(t, "first")
		for i := range want {
			at += rapid.Float64Range(0, 30).Draw(t, "step")
			want[i], room[i] = at, rapid.Float64Range(5, 25).Draw(t, "room")
			total += room[i]
		}
		low, high := 0.0, 200.0
		got := apart(want, room, low, high)
		for i := range got {
			if i > 0 && got[i] < got[i-1]+room[i-1]-1e-9 {
				t.Fatalf("%d begins at %g, within %g + %g", i, got[i], got[i-1], room[i-1])
			}
			if total <= high-low && (got[i] < low-1e-9 || got[i]+room[i] > high+1e-9) {
				t.Fatalf("%d lies from %g to %g", i, got[i], got[i]+room[i])
			}
		}
	})
	// What has room stays where it wants to be.
	want, room := []float64{10, 40, 90}, []float64{20, 20, 20}
	for i, got := range apart(want, room, 0, 200) {
		if got != want[i] {
			t.Errorf("%d was moved to %g", i, got)
		}
	}
	// Two that want one place share it.
	if got := apart([]float64{50, 50}, room[:2], 0, 200); got[0] != 40 || got[1] != 60 {
		t.Errorf("got %v, want 40 and 60", got)
	}
}

// What is left out of a curve was not seen: every point lies on what is left.
func TestThinned(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(0, 60).Draw(t, "n")
		points := make([]Point, n)
		for i := range points {
			points[i] = Point{float64(i), rapid.Float64Range(-3, 3).Draw(t, "y") * float64(rapid.IntRange(0, 1).Draw(t, "bend"))}
		}
		kept := thinned(points)
		if n > 0 && (kept[0] != points[0] || kept[len(kept)-1] != points[n-1]) {
			t.Fatal("an end is lost")
		}
		for _, p := range points {
			best := math.Inf(1)
			for i := 1; i < len(kept); i++ {
				if p.X >= kept[i-1].X && p.X <= kept[i].X {
					best = math.Min(best, p.from(kept[i-1], kept[i]))
				}
			}
			if n > 1 && best > 0.021 {
				t.Fatalf("%v is %g away", p, best)
			}
		}
	})
	straight := make([]Point, 201)
	for i := range straight {
		straight[i] = Point{float64(i), 2 * float64(i)}
	}
	if n := len(thinned(straight)); n != 2 {
		t.Errorf("a straight line keeps %d points", n)
	}
}

// The strokes of a hatch lie inside, and their length times their distance is
// the area (within the last stroke at each corner).
func TestHatch(t *testing.T) {
	for _, polygon := range [][]Point{box(3, 4, 60, 25), round(Point{20, 30}, 24), {{0, 0}, {50, 0}, {0, 40}}, {{0, 0}, {40, 0}, {40, 30}, {20, 10}, {0, 30}}} {
		d := newPad()
		const apart = 1.5
		d.hatch(hatching, apart, polygon...)
		area, length := 0.0, 0.0
		for i, a := range polygon {
			b := polygon[(i+1)%len(polygon)]
			area += (a.X*b.Y - b.X*a.Y) / 2
		}
		for _, it := range d.items {
			a, b := it.Path[0].P, it.Path[1].P
			length += math.Hypot(b.X-a.X, b.Y-a.Y)
			for _, u := range []float64{0.01, 0.3, 0.5, 0.99} {
				if p := (Point{a.X + u*(b.X-a.X), a.Y + u*(b.Y-a.Y)}); !contains(polygon, p) {
					t.Fatalf("%v lies outside", p)
				}
			}
		}
		if ratio := length * apart / math.Abs(area); math.Abs(ratio-1) > 0.05 {
			t.Errorf("the strokes fill %.3f of the area", ratio)
		}
	}
	d := newPad()
	d.hatch(hatching, 1, box(0, 0, math.Inf(1), 5)...)
	if len(d.items) != 0 {
		t.Error("an endless area is hatched")
	}
}

func contains(polygon []Point, p Point) bool {
	in := false
	for i, a := range polygon {
		b := polygon[(i+1)%len(polygon)]
		if (a.Y > p.Y) != (b.Y > p.Y) && p.X < a.X+(b.X-a.X)*(p.Y-a.Y)/(b.Y-a.Y) {
			in = !in
		}
	}
	return in
}

// Every point of an arc's curves is the radius away from its centre, to a
// thousandth of it.
func TestArc(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := Point{rapid.Float64Range(-9, 9).Draw(t, "x"), rapid.Float64Range(-9, 9).Draw(t, "y")}
		from, sweep := rapid.Float64Range(-7, 7).Draw(t, "from"), rapid.Float64Range(-2*math.Pi, 2*math.Pi).Draw(t, "sweep")
		const r = 10.0
		path := arcPath(c, r, from, sweep)
		last := path[0].P
		for _, s := range path[1:] {
			for u := 0.0; u <= 1; u += 0.125 {
				v := 1 - u
				x := v*v*v*last.X + 3*v*v*u*s.C1.X + 3*v*u*u*s.C2.X + u*u*u*s.P.X
				y := v*v*v*last.Y + 3*v*v*u*s.C1.Y + 3*v*u*u*s.C2.Y + u*u*u*s.P.Y
				if away := math.Hypot(x-c.X, y-c.Y); math.Abs(away-r) > 0.001*r {
					t.Fatalf("%g away", away)
				}
			}
			last = s.P
		}
		if end := c.toward(from+sweep, r); math.Hypot(last.X-end.X, last.Y-end.Y) > 1e-9*r {
			t.Fatalf("ends at %v, not %v", last, end)
		}
	})
}

func TestInside(t *testing.T) {
	r := rect{0, 0, 10, 10}
	for _, c := range []struct {
		s    span
		want float64
	}{
		{span{Point{-5, 5}, Point{15, 5}}, 10},
		{span{Point{2, 2}, Point{5, 6}}, 5},
		{span{Point{-5, -5}, Point{15, 15}}, 10 * math.Sqrt2},
		{span{Point{-5, 12}, Point{15, 12}}, 0},
		{span{Point{11, 0}, Point{11, 10}}, 0},
		{span{Point{5, 5}, Point{5, 5}}, 0},
	} {
		if got := r.inside(c.s); math.Abs(got-c.want) > 1e-9 {
			t.Errorf("%v: %g, want %g", c.s, got, c.want)
		}
	}
}

// A label keeps clear of strokes that are drawn after it was asked for, and
// what belongs to no point gets no line to one.
func TestLabelsWaitForStrokes(t *testing.T) {
	for _, later := range []func(d *pad){
		func(d *pad) { d.line(fine, Point{5, -40}, Point{5, 40}) },
		func(d *pad) { d.line(hidden, Point{-40, 0}, Point{40, 0}) },
		func(d *pad) { d.line(axisLine, Point{-40, -40}, Point{40, 40}) },
		func(d *pad) { d.dimension(Point{0, -8}, Point{60, -8}, 8, d.words("60")) },
		func(d *pad) { d.circle(outline, Point{}, 20) },
	} {
		d := newPad()
		d.near(d.words("label"), Point{}, 3, everywhere, 0)
		later(d)
		strokes := slices.Clone(d.lines)
		d.settle()
		for _, s := range strokes {
			if n := d.labels[0].inside(s); n > 0 {
				t.Errorf("the stroke %v runs %g through the label %v", s, n, d.labels[0])
			}
		}
	}
	d := newPad()
	for x := -30.0; x <= 30; x += 4 {
		d.line(fine, Point{x, -20}, Point{x, 20})
	}
	strokes := len(d.lines)
	d.about(d.words("label"), Point{}, 3, 0)
	d.settle()
	if len(d.lines) != strokes {
		t.Error("a line leads to where nothing is")
	}
	d.near(d.words("label"), Point{}, 3, everywhere, 0)
	d.settle()
	if len(d.lines) != strokes+1 {
		t.Errorf("%d lines lead to the point, want 1", len(d.lines)-strokes)
	}
}

func TestCrosses(t *testing.T) {
	s := span{Point{0, 0}, Point{10, 0}}
	for _, c := range []struct {
		o     span
		cross bool
		far   float64 // its start from s
	}{
		{span{Point{5, 5}, Point{5, -5}}, true, 5},
		{span{Point{5, 5}, Point{5, 1}}, false, 5},
		{span{Point{13, 4}, Point{13, -4}}, false, 5},
		{span{Point{-3, -4}, Point{9, 2}}, true, 5},
		{span{Point{4, 2}, Point{9, 2}}, false, 2},
	} {
		if got := s.crosses(c.o); got != c.cross {
			t.Errorf("%v: crosses is %t", c.o, got)
		}
		if got := c.o.a.toSpan(s); math.Abs(got-c.far) > 1e-9 {
			t.Errorf("%v: %g away, want %g", c.o.a, got, c.far)
		}
	}
	point := span{Point{3, 4}, Point{3, 4}}
	if got := (Point{}).toSpan(point); got != 5 {
		t.Errorf("%g from a point, want 5", got)
	}
}

// Of two values close to one another a figure never stands nearer to the
// other's dot than to its own, wherever a line of the grid lies between.
func TestFiguresStandAtTheirOwnDots(t *testing.T) {
	for _, apart := range []float64{4, 5, 7, 10} {
		for grid := -16.0; grid < 0; grid++ {
			d := newPad()
			p := [2]Point{{0, 0}, {0, apart}}
			d.line(fine, Point{-100, grid}, Point{100, grid})
			for _, q := range p {
				d.line(outline, q.plus(-100, 40), q.plus(100, -40))
				d.dot(q)
			}
			first := len(d.labels)
			for _, q := range p {
				d.near(d.words("411.8 N/mm"), q, 5, everywhere, math.Pi/4, 3*math.Pi/4, -math.Pi/4, -3*math.Pi/4)
			}
			d.settle()
			for i := range p {
				r := d.labels[first+i]
				own, other := r.distance(p[i]), r.distance(p[1-i])
				if own >= other && own <= 5+leaderFrom {
					t.Errorf("dots %g apart, grid at %g: the figure of dot %d is %g from it and %g from the other", apart, grid, i, own, other)
				}
			}
		}
	}
}
