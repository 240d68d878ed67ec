package figure

import (
	"encoding/xml"
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render/maths"
	"gusset/units"
)

func unitOf(t testing.TB, text string) units.Unit {
	if text == "" {
		return units.Unit{}
	}
	u, err := units.Parse(text)
	if err != nil {
		t.Fatal(err)
	}
	return u
}

// values makes a figure of a kind from values in SI, over rows if there are any.
func values(t testing.TB, kind string, rows []*check.Rows, x ...[]float64) *eval.Figure {
	f := &eval.Figure{Kind: kind}
	for _, k := range check.FigureKinds() {
		if k.Name != kind {
			continue
		}
		for i, p := range k.Params {
			f.Names, f.Exprs = append(f.Names, p.Name), append(f.Exprs, syntax.Expr(nil))
			if i >= len(x) || x[i] == nil {
				f.Args = append(f.Args, nil)
				continue
			}
			s := &eval.Step{Kind: eval.Constant, ID: p.Name, Symbol: p.Name, Unit: printedIn(t, p.Unit), Figures: 4}
			s.Value = eval.Value{Type: check.Type{Kind: check.Number}, Num: x[i]}
			if len(x[i]) > 1 || p.Column {
				s.Value.Type.Rows = rows
			}
			f.Args = append(f.Args, s)
		}
	}
	if f.Names == nil {
		t.Fatalf("no figure %s", kind)
	}
	return f
}

func printedIn(t testing.TB, si string) units.Unit {
	return unitOf(t, map[string]string{"Pa": "MPa", "m": "mm", "N": "kN", "": ""}[si])
}

// labels are the texts of a drawing.
func labels(d *Drawing) []string {
	var out []string
	for _, it := range d.Items {
		var b strings.Builder
		for _, r := range it.Text {
			b.WriteString(r.Text)
		}
		if it.Path == nil {
			out = append(out, b.String())
		}
	}
	return out
}

// The principal stresses, the largest shear stress and the direction drawn are
// the eigenvalues and eigenvectors of the stress tensor (gonum's symmetric
// eigenvalues), for 1,000 states.
func TestPrincipalStresses(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2))
	for range 1000 {
		var s [3]float64 // Pa
		for i := range s {
			s[i] = 1e6 * (400*random.Float64() - 200)
		}
		var eigen mat.EigenSym
		if !eigen.Factorize(mat.NewSymDense(2, []float64{s[0], s[2], s[2], s[1]}), true) {
			t.Fatal("no eigenvalues")
		}
		least, most := eigen.Values(nil)[0], eigen.Values(nil)[1]
		var vectors mat.Dense
		eigen.VectorsTo(&vectors)
		direction := math.Atan(vectors.At(1, 1) / vectors.At(0, 1))

		st := newStress(s[0], s[1], s[2])
		c, r, angle := st.circle()
		size := math.Max(math.Abs(least), math.Abs(most))
		for _, pair := range [][2]float64{{st.size * (c + r), most}, {st.size * (c - r), least}, {st.size * r, (most - least) / 2}} {
			if math.Abs(pair[0]-pair[1]) > 1e-12*size {
				t.Fatalf("%v: got %g, want %g", s, pair[0], pair[1])
			}
		}
		if away := math.Mod(math.Abs(angle-direction), math.Pi); math.Min(away, math.Pi-away) > 1e-9 {
			t.Fatalf("%v: the direction is %g, want %g", s, angle, direction)
		}
		if !(angle > -math.Pi/2 && angle <= math.Pi/2) {
			t.Fatalf("%v: the direction is %g", s, angle)
		}

		d := Sketch(values(t, "mohr", nil, s[:1], s[1:2], s[2:]))
		text := labels(d)
		for name, want := range map[string]float64{"σ1": most, "σ2": least, "τmax": (most - least) / 2} {
			label := name + "=" + string(maths.AppendPlain(nil, maths.Number{Value: units.Format(want/1e6, 4)})) + "MPa"
			if !slices.Contains(text, label) {
				t.Fatalf("%v: %q is not among %q", s, label, text)
			}
		}
		checkCircle(t, d, s, least, most)
	}
}

// checkCircle measures the circle on paper: its dots lie at the stresses, on
// one scale.
func checkCircle(t *testing.T, d *Drawing, s [3]float64, least, most float64) {
	t.Helper()
	var dots []Point // centre, largest, least, top, x, y
	for _, it := range d.Items {
		if n := len(it.Path); it.Colour == ink && it.Stroke == 0 && n == 6 && it.Path[1].Kind == Curve {
			dots = append(dots, Point{(it.Path[0].P.X + it.Path[2].P.X) / 2, (it.Path[0].P.Y + it.Path[2].P.Y) / 2})
		}
	}
	if len(dots) != 6 {
		t.Fatalf("%d dots", len(dots))
	}
	k := (dots[1].X - dots[2].X) / (most - least)
	middle := (most + least) / 2
	for i, want := range []Point{{middle, 0}, {most, 0}, {least, 0}, {middle, -(most - least) / 2}, {s[0], s[2]}, {s[1], -s[2]}} {
		x, y := dots[0].X+k*(want.X-middle), dots[0].Y+k*want.Y
		if math.Hypot(dots[i].X-x, dots[i].Y-y) > 0.01 {
			t.Fatalf("%v: dot %d lies at %v, want %g, %g", s, i, dots[i], x, y)
		}
	}
}

// heads are the directions of the arrowheads of a colour, with their points.
func heads(d *Drawing, c Colour) (out []struct{ at, way Point }) {
	for _, it := range d.Items {
		if it.Stroke == 0 && it.Colour == c && len(it.Path) == 4 && it.Path[3].Kind == Close && it.Path[1].Kind == Line {
			p, a, b := it.Path[0].P, it.Path[1].P, it.Path[2].P
			dx, dy := p.X-(a.X+b.X)/2, p.Y-(a.Y+b.Y)/2
			l := math.Hypot(dx, dy)
			out = append(out, struct{ at, way Point }{p, Point{dx / l, dy / l}})
		}
	}
	return out
}

// Tension pulls outwards; a positive shear stress points up on the right face,
// right on the upper one, and the other way on the opposite faces, so that the
// element is at rest.
func TestElementSigns(t *testing.T) {
	for _, c := range []struct{ x, y, tau float64 }{{80, 20, 30}, {-80, 20, -30}, {80, -20, 30}, {-80, -20, -30}, {0, 0, 30}, {50, 0, 0}, {0, 0, 0}} {
		d := Sketch(values(t, "element", nil, []float64{c.x * 1e6}, []float64{c.y * 1e6}, []float64{c.tau * 1e6}))
		square := nowhere
		for _, it := range d.Items {
			if it.Stroke == outline.width && len(it.Path) == 5 {
				square = it.extent()
			}
		}
		m := Point{(square.x0 + square.x1) / 2, (square.y0 + square.y1) / 2}
		forces, shears := heads(d, ink), heads(d, teal)
		want := 0
		for _, v := range []float64{c.x, c.y} {
			if v != 0 {
				want += 2
			}
		}
		if len(forces) != want || len(shears) != map[bool]int{true: 4, false: 0}[c.tau != 0] {
			t.Fatalf("%v: %d arrows of force and %d of shear", c, len(forces), len(shears))
		}
		for _, h := range forces {
			outward, value := h.at.X-m.X, c.x
			along := h.way.X
			if math.Abs(h.way.Y) > 0.5 {
				outward, value, along = h.at.Y-m.Y, c.y, h.way.Y
			}
			if (outward*along > 0) != (value > 0) {
				t.Errorf("%v: the arrow at %v points %v", c, h.at, h.way)
			}
		}
		for _, h := range shears {
			// On the right face up is −y of the drawing, on the upper one right is +x.
			right, upper := h.at.X > square.x1, h.at.Y < square.y0
			left, lower := h.at.X < square.x0, h.at.Y > square.y1
			var turn float64
			switch {
			case right:
				turn = -h.way.Y
			case left:
				turn = h.way.Y
			case upper:
				turn = h.way.X
			case lower:
				turn = -h.way.X
			}
			if turn*c.tau <= 0 {
				t.Errorf("%v: the shear arrow at %v points %v", c, h.at, h.way)
			}
		}
	}
}

// Forces point as they act, and the largest is marked.
func TestGroupForces(t *testing.T) {
	rows := &check.Rows{Name: "bolts", Marks: []string{"B1", "B2", "B3"}}
	f := values(t, "group", []*check.Rows{rows}, []float64{0, 0.1, 0.1}, []float64{0, 0, 0.08}, []float64{3000, 0, -1000}, []float64{0, 5000, -1000})
	d := Sketch(f)
	if !slices.Contains(labels(d), "B2:5.000kN") {
		t.Errorf("the largest force is not printed: %q", labels(d))
	}
	up := heads(d, red)
	if len(up) != 1 || up[0].way.Y > -0.999 {
		t.Errorf("the governing force points %v", up)
	}
	others := heads(d, ink)
	if len(others) != 2 || others[0].way.X < 0.999 || others[1].way.X > -0.7 || others[1].way.Y < 0.7 {
		t.Errorf("the forces point %v", others)
	}
}

// Of values over rows the entry that governs is drawn, all of it from that entry.
func TestGoverningEntry(t *testing.T) {
	cases := &check.Rows{Name: "cases", Marks: []string{"LC1", "LC2", "LC3"}}
	rows := []*check.Rows{cases}
	d := Sketch(values(t, "stress-strain", rows, []float64{81e9}, []float64{205e6}, []float64{1e-3, -4e-3, 2e-3}))
	text := strings.Join(labels(d), "|")
	if !strings.Contains(text, "γ=−0.004000,τ=−205.0MPa") || !strings.Contains(text, "drawn for LC2, which governs") {
		t.Error(text)
	}
	d = Sketch(values(t, "pin", rows, []float64{0.03, 0.02, 0.025}, []float64{0.01, 0.008, 0.01}, []float64{0.02}))
	text = strings.Join(labels(d), "|")
	if !strings.Contains(text, "d=20.00mm") || !strings.Contains(text, "t1=8.000mm") {
		t.Error(text)
	}
	bolts := &check.Rows{Name: "bolts", Marks: []string{"B1", "B2"}}
	f := values(t, "group", []*check.Rows{bolts}, []float64{0, 1}, []float64{0, 0}, nil, nil)
	for i := 2; i < 4; i++ {
		f.Args[i] = &eval.Step{Kind: eval.Computed, Unit: unitOf(t, "N"), Figures: 3, Value: eval.Value{
			Type: check.Type{Kind: check.Number, Rows: []*check.Rows{cases, bolts}}, Num: []float64{1, 2, 3, 4, 9, 1}}}
	}
	text = strings.Join(labels(Sketch(f)), "|")
	if !strings.Contains(text, "B1:12.7N") || !strings.Contains(text, "B2:1.41N") || !strings.Contains(text, "forces of LC3, which governs") {
		t.Error(text)
	}
}

func TestRefused(t *testing.T) {
	one := func(x float64) []float64 { return []float64{x} }
	for _, c := range []struct {
		kind string
		x    [][]float64
		want string
	}{
		{"pin", [][]float64{one(-0.02), one(0.01), one(0.01)}, "d = −20.00 mm is no size"},
		{"pin", [][]float64{one(0.02), one(0), one(0.01)}, "t_1 = 0 mm is no size"},
		{"pin", [][]float64{one(0.02), one(0.01), one(0.01), one(-0.001)}, "g = −1.000 mm is no gap"},
		{"pin", [][]float64{one(math.NaN()), one(0.01), one(0.01)}, "d has no value"},
		{"head", [][]float64{one(0.02), one(0.01), one(0.02)}, "no thinner"},
		{"lap", [][]float64{one(0.02), one(0.01), one(0.02), one(0)}, "n = 0 is no number of fasteners"},
		{"lap", [][]float64{one(0.02), one(0.01), one(0.02), one(-3)}, "n = −3.000 is no number of fasteners"},
		{"stress-strain", [][]float64{one(0), one(1e6), one(0.1)}, "G = 0 MPa is no size"},
		{"stress-strain", [][]float64{one(1e9), one(-1e6), one(0.1)}, "τ_y = −1.000 MPa is no size"},
		{"mohr", [][]float64{one(math.Inf(1)), one(0), one(0)}, "σ_x has no value"},
		{"shear-angle", [][]float64{one(1e9)}, "is no angle of a block"},
	} {
		d := Sketch(values(t, c.kind, nil, c.x...))
		if got := strings.Join(labels(d), " "); !strings.Contains(got, c.want) {
			t.Errorf("%s %v: %q, want %q", c.kind, c.x, got, c.want)
		}
	}
}

// sound fails on anything of a drawing that is not finite or beyond its
// edges, and on SVG that is not well formed.
func sound(t *rapid.T, d *Drawing) {
	if !(d.Width > 0 && d.Width <= column+0.01 && d.Height > 0 && d.Height < 1e4) {
		t.Fatalf("the drawing is %g by %g", d.Width, d.Height)
	}
	for i := range d.Items {
		r := d.Items[i].extent()
		if !(r.x0 >= -0.01 && r.y0 >= -0.01 && r.x1 <= d.Width+0.01 && r.y1 <= d.Height+0.01) {
			t.Fatalf("item %d covers %v of %g by %g: %+v", i, r, d.Width, d.Height, d.Items[i])
		}
		for _, run := range d.Items[i].Text {
			if run.Face == nil || !(run.Size > 0.5 && run.Size < 20) {
				t.Fatalf("item %d has text of %g", i, run.Size)
			}
		}
	}
	var v struct{}
	if err := xml.Unmarshal(d.SVG(nil, "x"), &v); err != nil {
		t.Fatal(err)
	}
	if strings.Contains(d.Desc, "NaN") || strings.Contains(d.Desc, "Inf") {
		t.Fatal(d.Desc)
	}
}

// Whatever its values, a sketch is sound.
func TestAnySketch(t *testing.T) {
	kinds := check.FigureKinds()
	rapid.Check(t, func(rt *rapid.T) {
		kind := rapid.SampledFrom(kinds).Draw(rt, "kind")
		rows := &check.Rows{Name: "rows"}
		for i := range rapid.IntRange(1, 9).Draw(rt, "rows") {
			rows.Marks = append(rows.Marks, fmt.Sprint("r", i))
		}
		value := anyNumber()
		if rapid.Bool().Draw(rt, "plain") {
			value = rapid.OneOf(rapid.Float64Range(0.0001, 100), rapid.Float64Range(-5, 5))
		}
		var x [][]float64
		for _, p := range kind.Params {
			if p.Optional && rapid.Bool().Draw(rt, "left out") {
				x = append(x, nil)
				continue
			}
			n := 1
			if p.Column || rapid.IntRange(0, 5).Draw(rt, "over rows") == 0 {
				n = rows.N()
			}
			x = append(x, rapid.SliceOfN(value, n, n).Draw(rt, p.Name))
		}
		sound(rt, Sketch(values(t, kind.Name, []*check.Rows{rows}, x...)))
	})
}

func anyCurve(n int) *rapid.Generator[eval.Curve] {
	return rapid.Custom(func(t *rapid.T) eval.Curve {
		c := eval.Curve{ID: "a", Symbol: rapid.SampledFrom([]string{"tau", "σ_x_long_subscript", "F", "a.b"}).Draw(t, "symbol"),
			Mark: rapid.OneOf(rapid.Just(""), rapid.String()).Draw(t, "mark"), Of: rapid.IntRange(1, 30).Draw(t, "of")}
		value := rapid.SampledFrom([]*rapid.Generator[float64]{anyNumber(), rapid.Float64Range(-9, 9), rapid.Just(3.0)}).Draw(t, "values")
		c.Y = rapid.SliceOfN(value, n, n).Draw(t, "y")
		if rapid.Bool().Draw(t, "broken") {
			c.Breaks = rapid.SliceOfNDistinct(rapid.IntRange(0, n-2), 0, n-1, rapid.ID[int]).Draw(t, "breaks")
		}
		c.At = value.Draw(t, "at")
		c.Present = []eval.Piece{{Figures: units.Format(c.At, 4)}}
		return c
	})
}

// No line leads across a break of a curve.
func TestPlotBreak(t *testing.T) {
	c := eval.Curve{ID: "a", Symbol: "a", Of: 1, X: []float64{0, 1, 2, 3}, Y: []float64{1, 2, -2, -1}, Breaks: []int{1}, Present: []eval.Piece{{Figures: "1"}}, At: 1}
	d := Plot(&eval.Plot{X: eval.Axis{Symbol: "d"}, Y: eval.Axis{Symbol: "a"}, Curves: []eval.Curve{c}, Present: []eval.Piece{{Figures: "0"}}})
	parts := 0
	for _, item := range d.Items {
		if item.Stroke == 1.2 && item.Colour == ink && len(item.Path) == 2 {
			parts++
		}
	}
	if parts != 2 {
		t.Errorf("the curve is drawn in %d parts of two points, want 2", parts)
	}
}

// Whatever its values, a plot is sound.
func TestAnyPlot(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		n := rapid.IntRange(2, 30).Draw(rt, "points")
		a, b := anyNumber().Draw(rt, "from"), anyNumber().Draw(rt, "to")
		p := &eval.Plot{Title: rapid.String().Draw(rt, "title"), X: eval.Axis{Symbol: "d", Unit: unitOf(t, "mm")}, Y: eval.Axis{Symbol: "tau", Unit: unitOf(t, "MPa")}}
		p.Curves = rapid.SliceOfN(anyCurve(n), 1, 8).Draw(rt, "curves")
		p.Limits = rapid.SliceOfN(anyCurve(n), 0, 3).Draw(rt, "limits")
		x := make([]float64, n)
		for i := range x {
			u := float64(i) / float64(n-1)
			x[i] = math.Min(a, b)*(1-u) + math.Max(a, b)*u
		}
		for _, list := range [][]eval.Curve{p.Curves, p.Limits} {
			for i := range list {
				list[i].X = x
			}
		}
		p.At = rapid.OneOf(rapid.SampledFrom(x), anyNumber()).Draw(rt, "at")
		p.Present = []eval.Piece{{Figures: units.Format(p.At, 4), Unit: p.X.Unit}}
		sound(rt, Plot(p))
	})
}

// Whatever the checks, their bars are sound.
func TestAnyBars(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		list := rapid.SliceOf(rapid.Custom(func(t *rapid.T) Bar {
			b := Bar{Number: "1.2", Note: rapid.String().Draw(t, "note"), Mark: rapid.String().Draw(t, "mark"), OK: rapid.Bool().Draw(t, "ok"), Ratio: math.NaN(),
				Word: rapid.SampledFrom([]string{"OK", "NG", "not required"}).Draw(t, "word")}
			if rapid.Bool().Draw(t, "formula") {
				b.Note, b.Formula = "", maths.Row{maths.Symbol{Head: "τ", Sub: []string{"d"}}, maths.Relation("<="), maths.Number{Value: "1"}}
			}
			if rapid.Bool().Draw(t, "rated") {
				b.Ratio = math.Abs(anyNumber().Draw(t, "ratio"))
				b.Utilisation = units.Format(b.Ratio, 3)
			}
			return b
		})).Draw(rt, "bars")
		sound(rt, Bars(rapid.String().Draw(rt, "title"), list))
	})
}
