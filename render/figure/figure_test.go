package figure_test

import (
	"bytes"
	"encoding/xml"
	"errors"
	"flag"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/notebook/eval"
	"gusset/render"
	"gusset/render/figure"
)

var update = flag.Bool("update", false, "write the golden files anew")

// drawn is a drawing of a file in testdata: pin-3 is the third of pin.md.
type drawn struct {
	name string
	*figure.Drawing
}

// drawings are all drawings of the files in testdata.
func drawings(t testing.TB) []drawn {
	t.Helper()
	files, err := filepath.Glob("testdata/*.md")
	if err != nil || len(files) == 0 {
		t.Fatal("no calc files", err)
	}
	var out []drawn
	for _, file := range files {
		sheet, err := notebook.Open(file)
		if err != nil {
			t.Fatal(err)
		}
		for _, d := range sheet.Diagnostics {
			t.Logf("%s: %s", file, d.Message)
		}
		if sheet.Failed() {
			t.Fatalf("%s has errors", file)
		}
		for _, entries := range render.NewPage(sheet).Blocks {
			for _, e := range entries {
				if e.Drawing != nil {
					name := strings.TrimSuffix(filepath.Base(file), ".md") + "-" + e.Drawing.Number
					if e.Drawing.Art == nil {
						t.Fatalf("%s is not drawn", name)
					}
					out = append(out, drawn{name, e.Drawing.Art})
				}
			}
		}
	}
	return out
}

func TestGolden(t *testing.T) {
	seen := map[string]bool{}
	for _, d := range drawings(t) {
		golden := filepath.Join("testdata", d.name+".svg")
		seen[golden] = true
		got := append(d.SVG(nil, d.name), '\n')
		if *update {
			if err := os.WriteFile(golden, got, 0o666); err != nil {
				t.Fatal(err)
			}
			continue
		}
		want, err := os.ReadFile(golden)
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(want, got) {
			t.Errorf("%s: %s", d.name, firstDifference(string(want), string(got)))
		}
	}
	files, _ := filepath.Glob("testdata/*.svg")
	for _, f := range files {
		if !seen[f] {
			t.Errorf("%s is of no drawing", f)
		}
	}
}

// firstDifference shows the first line in which two texts differ.
func firstDifference(want, got string) string {
	w, g := strings.Split(want, "\n"), strings.Split(got, "\n")
	for i := range min(len(w), len(g)) {
		if w[i] != g[i] {
			return fmt.Sprintf("line %d\nwant %s\ngot  %s", i+1, w[i], g[i])
		}
	}
	return fmt.Sprintf("%d lines, want %d", len(g), len(w))
}

// An XML reader takes every drawing, and finds its title, its description and
// each text once.
func TestSVGIsWellFormed(t *testing.T) {
	for _, d := range drawings(t) {
		texts, named := 0, 0
		err := elements(d.SVG(nil, d.name), func(e xml.StartElement) {
			switch e.Name.Local {
			case "text":
				texts++
			case "title", "desc":
				named++
			}
		})
		if err != nil {
			t.Errorf("%s: %v", d.name, err)
		}
		want := 0
		for _, it := range d.Items {
			if it.Path == nil {
				want++
			}
		}
		if texts != want || named != 2 || d.Title == "" || d.Desc == "" {
			t.Errorf("%s: %d texts, want %d; %d of title and description", d.name, texts, want, named)
		}
	}
}

func elements(svg []byte, visit func(xml.StartElement)) error {
	dec := xml.NewDecoder(bytes.NewReader(svg))
	for {
		token, err := dec.Token()
		if errors.Is(err, io.EOF) {
			return nil
		}
		if err != nil {
			return err
		}
		if e, ok := token.(xml.StartElement); ok {
			visit(e)
		}
	}
}

// area is what an item covers, texts by the height of their letters.
func area(it *figure.Item) (x0, y0, x1, y1 float64) {
	first := true
	grow := func(ax, ay, bx, by float64) {
		if first {
			x0, y0, x1, y1, first = ax, ay, bx, by, false
			return
		}
		x0, y0, x1, y1 = min(x0, ax), min(y0, ay), max(x1, bx), max(y1, by)
	}
	for _, s := range it.Path {
		if s.Kind != figure.Close {
			grow(s.P.X, s.P.Y, s.P.X, s.P.Y)
		}
		if s.Kind == figure.Curve {
			grow(s.C1.X, s.C1.Y, s.C1.X, s.C1.Y)
			grow(s.C2.X, s.C2.Y, s.C2.X, s.C2.Y)
		}
	}
	for _, r := range it.Text {
		grow(r.X, r.Y-0.7*r.Size, r.X+r.Width, r.Y+0.2*r.Size)
	}
	return x0, y0, x1, y1
}

func textOf(it *figure.Item) string {
	var b strings.Builder
	for _, r := range it.Text {
		b.WriteString(r.Text)
	}
	return b.String()
}

// texts are the labels of a drawing.
func texts(d *figure.Drawing) []string {
	var out []string
	for i := range d.Items {
		if it := &d.Items[i]; it.Path == nil {
			out = append(out, textOf(it))
		}
	}
	return out
}

// fault is what is wrong with a drawing: something beyond its edges or not
// finite, or "".
func fault(d *figure.Drawing) string {
	if !(d.Width > 0 && d.Width < 340 && d.Height > 0 && d.Height < 5000) {
		return fmt.Sprintf("the drawing is %g by %g", d.Width, d.Height)
	}
	for i := range d.Items {
		it := &d.Items[i]
		x0, y0, x1, y1 := area(it)
		if !(x0 >= -0.01 && y0 >= -0.01 && x1 <= d.Width+0.01 && y1 <= d.Height+0.01) {
			return fmt.Sprintf("item %d %q covers %g, %g to %g, %g of %g by %g", i, textOf(it), x0, y0, x1, y1, d.Width, d.Height)
		}
		if !(it.Stroke >= 0 && it.Stroke < 20) {
			return fmt.Sprintf("item %d has a line of %g", i, it.Stroke)
		}
		for _, r := range it.Text {
			if !(r.Size > 0 && r.Size < 20) || r.Face == nil {
				return fmt.Sprintf("item %d has text of %g", i, r.Size)
			}
		}
	}
	return ""
}

// No label covers another, and all lies within the drawing.
func TestLabelsKeepApart(t *testing.T) {
	for _, d := range drawings(t) {
		if f := fault(d.Drawing); f != "" {
			t.Errorf("%s: %s", d.name, f)
		}
		for i := range d.Items {
			for j := range i {
				a, b := &d.Items[i], &d.Items[j]
				if a.Path != nil || b.Path != nil {
					continue
				}
				ax0, ay0, ax1, ay1 := area(a)
				bx0, by0, bx1, by1 := area(b)
				if w, h := min(ax1, bx1)-max(ax0, bx0), min(ay1, by1)-max(ay0, by0); w > 0.2 && h > 0.2 {
					t.Errorf("%s: %q and %q overlap by %.1f × %.1f", d.name, textOf(a), textOf(b), w, h)
				}
			}
		}
	}
}

// What a drawing must say, whatever its look.
func TestTexts(t *testing.T) {
	all := map[string]*figure.Drawing{}
	for _, d := range drawings(t) {
		all[d.name] = d.Drawing
	}
	for _, c := range []struct {
		name string
		want []string // begins of labels
	}{
		{"pin-1", []string{"τ[MPa]", "d[mm]", "τd=136.6MPa", "48.89MPa", "d=25mm"}},
		{"pin-2", []string{"Shear in the pin and bearing on the plate", "τ,σb[MPa]", "160.0MPa", "48.89MPa"}},
		{"pin-3", []string{"γ", "the present value P = 48 kN lies outside the range"}},
		{"pin-4", []string{"Checks of the pin", "1.13 NG", "9.02 NG", "0.80 OK", "not required", "d≥20mm", "utilisation", "1.0"}},
		{"pin-5", []string{"d=25mm", "t1=8mm", "t2=12mm", "g=1mm", "A=πd2/4=490.9mm²", "each of the 2 shear planes"}},
		{"pin-7", []string{"2d=50.00mm", "t2=12mm", "d=25mm", "A=π(2d)t2=1885mm²"}},
		{"pin-8", []string{"d=40mm", "the size of the shank is not given"}},
		{"pin-9", []string{"t1=8mm", "d=25mm", "3d=75.00mm", "4 shear planes, eachA=πd2/4=490.9mm²"}},
		{"pin-11", []string{"12 of 20 fasteners are drawn", "the spacing is not given and drawn as three diameters"}},
		{"pin-12", []string{"γ=6.036×10−4", "the angle is drawn 500 times as large as it is"}},
		{"pin-13", []string{"γ=−12°", "the angle is drawn to scale"}},
		{"pin-14", []string{"the block is not sheared"}},
		{"pin-15", []string{"τy=205.0MPa", "G=81GPa", "γy=0.002530", "the part is elastic"}},
		{"pin-16", []string{"the part has yielded"}},
		{"stress-1", []string{"σ1=92.43MPa", "σ2=7.574MPa", "τmax=42.43MPa", "θp=22.50°", "σm=50.00MPa", "the largest shear stress over all planes lies outside this one: 46.21 MPa"}},
		{"stress-2", []string{"σx=80MPa", "σy=20MPa", "τxy=30MPa"}},
		{"stress-10", []string{"σ1=σ2=0MPa"}},
		{"stress-12", []string{"drawn for LC2, which governs"}},
		{"group-1", []string{"B1:43.18kN", "140.0mm", "forces of LC1, which governs"}},
		{"group-3", []string{"no fastener carries a force"}},
		{"group-4", []string{"LC1", "LC2", "LC3", "FRd=94kN"}},
		{"group-5", []string{"F has a curve for each of 24 entries"}},
	} {
		if all[c.name] == nil {
			t.Errorf("no drawing %s", c.name)
			continue
		}
		got := texts(all[c.name])
		for _, want := range c.want {
			found := false
			for _, g := range got {
				found = found || strings.HasPrefix(g, want)
			}
			if !found {
				t.Errorf("%s does not say %q: %q", c.name, want, got)
			}
		}
	}
}

// The circle on paper says what the helper plane_stress computes.
func TestMohrAgreesWithHelper(t *testing.T) {
	for _, state := range [][3]string{{"80", "20", "30"}, {"-80", "30", "-25"}, {"10", "10", "-5"}, {"20", "50", "0"}, {"-7.5", "-90", "12"}} {
		calc := fmt.Sprintf("---\ncalc: C-1\nunits: [MPa, deg]\n---\n\n```calc\nx = %s MPa\ny = %s MPa\nxy = %s MPa\np = plane_stress(x, y, xy)\n```\n\n```figure mohr x, y, xy\n```\n", state[0], state[1], state[2])
		sheet := notebook.Compile(&notebook.Context{FS: fstest.MapFS{"a.md": {Data: []byte(calc)}}, Panics: true}, "a.md")
		if sheet.Failed() {
			t.Fatal(sheet.Diagnostics)
		}
		got := texts(figure.Sketch(sheet.Blocks[1].Figure))
		for id, name := range map[string]string{"p.sigma_1": "σ1", "p.sigma_2": "σ2", "p.tau_max": "τmax", "p.theta_p": "θp"} {
			found := false
			for _, s := range sheet.Steps {
				for _, r := range s.Results {
					if r.ID == id {
						found = true
						want := name + "=" + strings.NewReplacer("-", "−", " ", "").Replace(eval.PlainText(r.Printed(0)))
						if !slices.Contains(got, want) {
							t.Errorf("%v: %q is not among %q", state, want, got)
						}
					}
				}
			}
			if !found {
				t.Errorf("no value %s", id)
			}
		}
	}
}

func BenchmarkDrawing(b *testing.B) {
	calc := "---\ncalc: C-1\n---\n\n```calc\nd = 25 mm\nr = 1e3*d^2 + d*1 m*sin(d/1 mm)\n```\n\n```plot\nr against d from 1 mm to 40 mm\n```\n\n```figure mohr 80 MPa, 20 MPa, 30 MPa\n```\n"
	sheet := notebook.Compile(&notebook.Context{FS: fstest.MapFS{"a.md": {Data: []byte(calc)}}}, "a.md")
	if sheet.Failed() {
		b.Fatal(sheet.Diagnostics)
	}
	var buf []byte
	b.Run("plot", func(b *testing.B) {
		for b.Loop() {
			buf = figure.Plot(sheet.Blocks[1].Plot).SVG(buf[:0], "a")
		}
	})
	b.Run("mohr", func(b *testing.B) {
		for b.Loop() {
			buf = figure.Sketch(sheet.Blocks[2].Figure).SVG(buf[:0], "a")
		}
	})
}
