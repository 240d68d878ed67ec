package figure

import (
	"fmt"
	"math"
	"strings"

	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render/fonts"
	"gusset/render/maths"
	"gusset/units"
)

// sketch is a figure in the making: a drawing with the values it is made from.
type sketch struct {
	*pad
	args []arg
	mark string // the entry that is drawn, of values over rows
}

// arg is a parameter with its value in coherent SI.
type arg struct {
	name  string
	expr  syntax.Expr
	step  *eval.Step // nil where the author left it out
	entry int
	x     float64
}

// Sketch draws a figure, to scale from the values of its parameters. Of values
// over rows it draws the entry that governs.
func Sketch(f *eval.Figure) *Drawing {
	s := &sketch{pad: newPad()}
	if f.Kind == "group" {
		return s.group(f)
	}
	s.choose(f)
	var d *Drawing
	switch f.Kind {
	case "mohr":
		d = s.mohr()
	case "element":
		d = s.element()
	case "shear-angle":
		d = s.shearAngle()
	case "stress-strain":
		d = s.stressStrain()
	case "pin":
		d = s.pin()
	case "head":
		d = s.pulledThrough()
	case "lap":
		d = s.lap()
	default:
		d = s.refuse("there is no figure "+f.Kind, f.Kind)
	}
	return d
}

// severity is how much an entry of a figure's values governs over others.
func severity(kind string, x []float64) float64 {
	switch kind {
	case "mohr", "element":
		// Equivalent stress after von Mises, squared.
		k := math.Max(math.Max(math.Abs(x[0]), math.Abs(x[1])), math.Abs(x[2]))
		if k == 0 {
			return 0
		}
		a, b, c := x[0]/k, x[1]/k, x[2]/k
		return k * math.Sqrt(a*a-a*b+b*b+3*c*c)
	case "shear-angle":
		return math.Abs(x[0])
	case "stress-strain":
		return math.Abs(x[2])
	case "head":
		return -x[0] * x[1]
	case "lap":
		return -x[2]
	}
	return -x[0]
}

// choose finds the entry that governs and takes the parameters' values there.
func (s *sketch) choose(f *eval.Figure) {
	joint := jointType(f)
	values := make([]float64, len(f.Args))
	best, most := 0, math.Inf(-1)
	for e := range joint.Count() {
		for i, a := range f.Args {
			values[i] = valueAt(a, joint, e)
		}
		if v := severity(f.Kind, values); v > most {
			best, most = e, v
		}
	}
	s.mark = joint.Mark(best)
	for i, a := range f.Args {
		s.args = append(s.args, arg{name: f.Names[i], expr: f.Exprs[i], step: a, entry: entryAt(a, joint, best), x: valueAt(a, joint, best)})
	}
}

// jointType has all the rows that a figure's values run over.
func jointType(f *eval.Figure) check.Type {
	t := check.Type{Kind: check.Number}
	for _, a := range f.Args {
		if a == nil {
			continue
		}
		for _, r := range a.Value.Type.Rows {
			if !hasRows(t.Rows, r) {
				t.Rows = append(t.Rows, r)
			}
		}
	}
	return t
}

func hasRows(list []*check.Rows, r *check.Rows) bool {
	for _, o := range list {
		if o == r {
			return true
		}
	}
	return false
}

func entryAt(a *eval.Step, joint check.Type, e int) int {
	if a == nil {
		return 0
	}
	return max(joint.Project(e, a.Value.Type), 0)
}

// valueAt is a value at an entry of all rows, NaN where there is none.
func valueAt(a *eval.Step, joint check.Type, e int) float64 {
	if i := entryAt(a, joint, e); a != nil && i < len(a.Value.Num) {
		return a.Value.Num[i]
	}
	return math.NaN()
}

// arg finds a parameter.
func (s *sketch) arg(name string) *arg {
	for i := range s.args {
		if s.args[i].name == name {
			return &s.args[i]
		}
	}
	return &arg{name: name, x: math.NaN()}
}

func (s *sketch) has(name string) bool { return s.arg(name).step != nil }

// symbolOf is how the author calls a parameter's value: by its name or by a
// formula. A literal, and a formula too long for a drawing, goes by the
// parameter's own name.
func (s *sketch) symbolOf(name string) maths.Node {
	const room = 90
	expr := s.arg(name).expr
	if n, _ := literal(expr); expr == nil || n != nil {
		return s.name(name)
	}
	n := s.maths.Write(expr, nil)
	if s.label(n).set.Width > room {
		return s.name(name)
	}
	return n
}

// literal is an expression that is only a number, with its sign; nil where it
// is more.
func literal(x syntax.Expr) (n *syntax.Number, negative bool) {
	switch x := x.(type) {
	case *syntax.Number:
		return x, x.Neg
	case *syntax.Unary:
		if n, ok := x.X.(*syntax.Number); ok && x.Op == syntax.Neg {
			return n, !n.Neg
		}
	}
	return nil, false
}

// factorOf is the same where it is multiplied or raised to a power.
func (s *sketch) factorOf(name string) maths.Node {
	n := s.symbolOf(name)
	if _, ok := n.(maths.Symbol); ok {
		return n
	}
	return maths.Paren(n)
}

// valueOf is a parameter's value as printed; of a literal the author's own
// figures.
func (s *sketch) valueOf(name string) maths.Node {
	a := s.arg(name)
	if a.step == nil {
		return maths.Text{Text: "–"}
	}
	if n, negative := literal(a.expr); n != nil {
		pieces := make([]eval.Piece, len(n.Pieces))
		for i, p := range n.Pieces {
			pieces[i] = eval.Piece{Figures: strings.ReplaceAll(p.Figures, "_", ""), Unit: p.Unit}
		}
		if negative {
			pieces[0].Figures = "-" + pieces[0].Figures
		}
		return s.maths.Pieces(pieces, maths.Ref{})
	}
	return s.maths.Pieces(a.step.Printed(a.entry), maths.Ref{})
}

// given is a parameter with its value.
func (s *sketch) given(name string) label {
	return s.label(equals(s.symbolOf(name), s.valueOf(name)))
}

// like is a value worked out from a parameter and printed as that is.
func (s *sketch) like(name string, x float64) maths.Node {
	a := s.arg(name)
	return s.number(a.step.Unit.FromSI(x), a.step.Unit, a.step.Figures)
}

// area is an area printed in the square of a length's unit.
func (s *sketch) area(of string, x float64) maths.Node {
	a := s.arg(of)
	u, err := units.Parse(a.step.Unit.String() + "^2")
	if err != nil || len(a.step.Unit.Terms()) != 1 {
		u, _ = units.Parse("mm^2")
	}
	return s.number(u.FromSI(x), u, a.step.Figures)
}

func degrees(d *pad, angle float64) maths.Node {
	deg, _ := units.Parse("deg")
	return d.number(deg.FromSI(angle), deg, 4)
}

// drawable tells whether a value is of a magnitude that sketches work with: no
// product of three such values is out of a double's range.
func drawable(x float64) bool {
	const largest, least = 1e100, 1e-100
	return x == 0 || math.Abs(x) <= largest && math.Abs(x) >= least
}

// finite tells which of the parameters named has no value that can be drawn.
func (s *sketch) finite(names ...string) (fault string) {
	for _, n := range names {
		switch a := s.arg(n); {
		case a.step == nil:
		case math.IsNaN(a.x) || math.IsInf(a.x, 0):
			return fmt.Sprintf("not drawn: %s has no value", plainOf(s.symbolOf(n)))
		case !drawable(a.x):
			return fmt.Sprintf("not drawn: %s is out of the range of drawings", plainOf(s.symbolOf(n)))
		}
	}
	return ""
}

// sizes tells which of the parameters named is no size that can be drawn.
func (s *sketch) sizes(names ...string) (fault string) {
	if why := s.finite(names...); why != "" {
		return why
	}
	for _, n := range names {
		if a := s.arg(n); a.step != nil && !(a.x > 0) {
			return fmt.Sprintf("not drawn: %s is no size", plainOf(equals(s.symbolOf(n), s.valueOf(n))))
		}
	}
	return ""
}

// refuse is a drawing that says only why nothing is drawn.
func (s *sketch) refuse(why, title string) *Drawing {
	for i, l := range s.wrap(why, fonts.Sans, labelSize, column-20) {
		s.put(l, Point{8, 14 + 1.35*labelSize*float64(i)})
	}
	room := s.extent()
	s.polygon(stroke{hair, thin, nil}, box(0, 0, room.x1+8, room.y1+6)...)
	return s.finish(title, why)
}

// done ends a sketch. What it shows is said in sentences.
func (s *sketch) done(title string, sentences ...string) *Drawing {
	if s.mark != "" {
		s.notes = append(s.notes, "drawn for "+s.mark+", which governs")
	}
	for i := range s.args {
		if s.args[i].step != nil {
			n := s.args[i].name
			sentences = append(sentences, plainOf(equals(s.symbolOf(n), s.valueOf(n)))+".")
		}
	}
	return s.finish(title, s.described(sentences))
}

// described is what a drawing shows in sentences, its notes among them.
func (d *pad) described(sentences []string) string {
	for _, n := range d.notes {
		sentences = append(sentences, n+".")
	}
	return strings.Join(sentences, " ")
}

func plainOf(n maths.Node) string { return string(maths.AppendPlain(nil, n)) }

// divided is a fraction on the line: P/2.
func divided(n maths.Node, by string) maths.Node {
	return maths.Row{n, maths.Slash, maths.Number{Value: by}}
}
