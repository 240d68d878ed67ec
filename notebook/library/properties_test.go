package library_test

import (
	"fmt"
	"math"
	"regexp"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gusset/notebook"
	"gusset/notebook/eval"
	"gusset/units"
)

// measured are base units to measure in: one for each of m, kg, s, K.
type measured map[string]string

func drawMeasured(t *rapid.T) measured {
	return measured{
		"m":  rapid.SampledFrom([]string{"m", "mm", "cm", "in", "ft"}).Draw(t, "length"),
		"kg": rapid.SampledFrom([]string{"kg", "g", "t", "lbm"}).Draw(t, "mass"),
		"s":  rapid.SampledFrom([]string{"s", "ms", "min", "h"}).Draw(t, "time"),
		"K":  rapid.SampledFrom([]string{"K", "degR"}).Draw(t, "temperature"),
	}
}

var baseName = regexp.MustCompile(`[a-zA-Z]+`)

// unit is the product of these base units that has a dimension.
func (m measured) unit(d units.Dimension) units.Unit {
	text := baseName.ReplaceAllStringFunc(d.Base(), func(name string) string { return m[name] })
	if text == "" {
		return units.Unit{}
	}
	u, err := units.Parse(text)
	if err != nil {
		panic(err)
	}
	return u
}

// again writes a call that was run with its arguments in other units. figures turns an argument in SI to
// the figure that stands before the unit.
func again(call *eval.Call, m measured, figure func(si float64, u units.Unit) float64) string {
	var head, args []string
	var cols [][]float64
	for i, a := range call.Args {
		name, u := call.Helper.Params[i].Name.ID, m.unit(a.Value.Type.Dim)
		if len(a.Value.Type.Rows) == 0 {
			args = append(args, fmt.Sprintf("%s=%.17g %s", name, figure(a.Value.Num[0], u), u))
			continue
		}
		var col []float64
		for _, x := range a.Value.Num {
			col = append(col, figure(x, u))
		}
		head, cols = append(head, fmt.Sprintf("%s [%s]", name, u)), append(cols, col)
		args = append(args, name+"=s."+name)
	}
	var b strings.Builder
	if len(cols) > 0 {
		fmt.Fprintf(&b, "```schedule s\nmark | %s\n", strings.Join(head, " | "))
		for i := range cols[0] {
			fmt.Fprintf(&b, "R%d", i)
			for _, c := range cols {
				fmt.Fprintf(&b, " | %.17g", c[i])
			}
			b.WriteString("\n")
		}
		b.WriteString("```\n")
	}
	return fmt.Sprintf("%sr = %s(%s)\n", b.String(), call.Helper.Name.ID, strings.Join(args, ", "))
}

// results are what a call gave, one step for each result.
func results(s *notebook.Sheet) []*eval.Step {
	for _, st := range s.Steps {
		if st.ID == "r" && !st.Failed {
			if len(st.Results) > 0 {
				return st.Results
			}
			return []*eval.Step{st}
		}
	}
	return nil
}

// firstCall is the call of a row, as it was run.
func firstCall(t *rapid.T, r row) (*eval.Call, []*eval.Step) {
	sheet := compile(r.setup + "\nr = " + r.call + "\n")
	for _, st := range sheet.Steps {
		if st.ID == "r" && len(st.Calls) > 0 {
			return st.Calls[len(st.Calls)-1], results(sheet)
		}
	}
	t.Fatalf("%s was not run\n%s", r.call, messages(sheet))
	return nil, nil
}

// sameResults compares results entry by entry, within what rounding of the largest of their kind explains.
func sameResults(t *rapid.T, call string, got, want []*eval.Step, factor func(units.Dimension) float64) {
	if len(got) != len(want) {
		t.Fatalf("%s: %d results, want %d", call, len(got), len(want))
	}
	size := map[units.Dimension]float64{}
	for _, w := range want {
		for _, x := range w.Value.Num {
			if !math.IsNaN(x) {
				size[w.Value.Type.Dim] = max(size[w.Value.Type.Dim], math.Abs(x))
			}
		}
	}
	for i, w := range want {
		dim := w.Value.Type.Dim
		for k, x := range w.Value.Num {
			g := got[i].Value.Num[k]
			if math.IsNaN(x) && math.IsNaN(g) {
				continue
			}
			if f := factor(dim); !(math.Abs(g-x*f) <= 1e-8*size[dim]*f) {
				t.Fatalf("%s: %s is %g, want %g", call, w.ID, g, x*f)
			}
		}
	}
}

// A helper gives the same whatever units its arguments come in.
func TestUnitsOfArgumentsDoNotMatter(t *testing.T) {
	rows := outside()
	rapid.Check(t, func(t *rapid.T) {
		r := rapid.SampledFrom(rows).Draw(t, "row")
		call, want := firstCall(t, r)
		text := again(call, drawMeasured(t), func(si float64, u units.Unit) float64 { return u.FromSI(si) })
		sheet := compile(text)
		if sheet.Failed() {
			t.Fatalf("%s\n%s", text, messages(sheet))
		}
		sameResults(t, text, results(sheet), want, func(units.Dimension) float64 { return 1 })
	})
}

// absolute are the helpers whose formulas or limits hold a size or a strength of their own.
var absolute = map[string]bool{
	"embedment_ec5": true, "embedment_bolt_ec5": true, "nail_yield_moment_ec5": true, "dowel_single_nds": true, "punching_ec2": true,
	"two_way_shear_aci": true, "web_shear_ec3": true, "weld_fillet_ec3": true, "bolt_shear_ec3": true,
}

// All others are mechanics: with lengths, masses and times scaled, each result scales as its dimension says, so that forces times f and
// lengths times l give stresses times f/l².
func TestScaling(t *testing.T) {
	var rows []row
	for _, r := range outside() {
		if !absolute[r.name()] {
			rows = append(rows, r)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		r := rapid.SampledFrom(rows).Draw(t, "row")
		call, want := firstCall(t, r)
		m := drawMeasured(t)
		text := again(call, m, func(si float64, u units.Unit) float64 { return si })
		sheet := compile(text)
		if sheet.Failed() {
			t.Fatalf("%s\n%s", text, messages(sheet))
		}
		sameResults(t, text, results(sheet), want, func(d units.Dimension) float64 { return m.unit(d).ToSI(1) })
	})
}

func drawStress(t *rapid.T, name string) float64 {
	return math.Round(rapid.Float64Range(-400, 400).Draw(t, name)*100) / 100
}

// Turning the axes leaves principal and equivalent stresses, and turns the principal direction back.
func TestRotationLeavesInvariants(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x, y, xy := drawStress(t, "x"), drawStress(t, "y"), drawStress(t, "xy")
		angle := rapid.Float64Range(-360, 360).Draw(t, "angle")
		sheet := compile(fmt.Sprintf(`a = plane_stress(%g MPa, %g MPa, %g MPa)
b = stress_rotate(%g MPa, %g MPa, %g MPa, %g deg)
c = plane_stress(b.sigma_n, b.sigma_t, b.tau_nt)`, x, y, xy, x, y, xy, angle))
		value := func(id string) float64 {
			st := step(sheet, id)
			if st == nil {
				t.Fatalf("no %s\n%s", id, messages(sheet))
			}
			return st.Value.Num[0]
		}
		for _, result := range []string{"sigma_1", "sigma_2", "tau_max", "tau_abs", "sigma_v", "sigma_tresca"} {
			if a, c := value("a."+result), value("c."+result); math.Abs(a-c) > 1e-9*(math.Abs(x)+math.Abs(y)+math.Abs(xy))*1e6 {
				t.Fatalf("%s is %g and turned %g", result, a, c)
			}
		}
		if radius := value("a.tau_max"); radius > 1e5 {
			off := math.Mod(value("a.theta_p")-value("c.theta_p")-angle*math.Pi/180, math.Pi)
			if math.Abs(math.Sin(off)) > 1e-6 {
				t.Fatalf("the direction is off by %g", off)
			}
		}
		for _, p := range []string{"a.theta_p", "c.theta_p"} {
			if theta := value(p); !(theta > -math.Pi/2 && theta <= math.Pi/2*(1+1e-15)) {
				t.Fatalf("%s = %g", p, theta)
			}
		}
	})
}

// The forces on the fasteners add up to the load, elastic and at ultimate, wherever the origin lies.
func TestGroupsBalanceTheirLoad(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(2, 9).Draw(t, "bolts")
		var b strings.Builder
		b.WriteString("```schedule b\nmark | x [mm] | y [mm]\n")
		for i := range n {
			fmt.Fprintf(&b, "B%d | %d | %d\n", i, rapid.IntRange(-200, 200).Draw(t, "x")+i, rapid.IntRange(-200, 200).Draw(t, "y"))
		}
		px, py, m := drawStress(t, "P_x"), drawStress(t, "P_y"), drawStress(t, "M")/10
		e, theta := drawStress(t, "e"), rapid.Float64Range(-80, 80).Draw(t, "theta")
		fmt.Fprintf(&b, "```\nf = bolt_group_elastic(b.x, b.y, %g kN, %g kN, %g kN*m)\n", px, py, m)
		b.WriteString("X [kN] = sum(f.F_x)\nY [kN] = sum(f.F_y)\nM [kN*m] = sum((b.x - mean(b.x))*f.F_y - (b.y - mean(b.y))*f.F_x)\n")
		fmt.Fprintf(&b, "u = bolt_group_ic(b.x, b.y, %g mm, %g deg)\n", e, theta)
		sheet := compile(b.String())
		if sheet.Failed() {
			t.Skip("bolts in one place") // that it is the only failure is for TestLimits
		}
		for _, c := range []struct {
			id   string
			want float64
		}{{"X", px * 1000}, {"Y", py * 1000}, {"M", m * 1000}} {
			if got := step(sheet, c.id).Value.Num[0]; math.Abs(got-c.want) > 1e-6*(1000+math.Abs(c.want)) {
				t.Fatalf("%s is %g, want %g\n%s", c.id, got, c.want, b.String())
			}
		}
		// the residuals that the helper prints
		for _, st := range sheet.Steps {
			if st.ID != "u" {
				continue
			}
			residuals := 0
			for _, line := range st.Calls[0].Steps {
				if strings.HasPrefix(line.ID, "r_") {
					residuals++
					if !(line.Value.Num[0] <= 1e-8) {
						t.Fatalf("the residual %s is %g\n%s", line.ID, line.Value.Num[0], b.String())
					}
				}
			}
			if residuals != 2 {
				t.Fatalf("%d residuals are printed, want 2", residuals)
			}
		}
		if c := step(sheet, "u.C").Value.Num[0]; !(c > 0 && c <= float64(n)*math.Pow(1-math.Exp(-3.4), 0.55)*(1+1e-9)) {
			t.Fatalf("C = %g of %d bolts", c, n)
		}
	})
}
