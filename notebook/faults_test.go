package notebook

import (
	"flag"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"testing/fstest"

	"github.com/google/go-cmp/cmp"
	"github.com/rogpeppe/go-internal/txtar"

	"gusset/notebook/diag"
)

var update = flag.Bool("update", false, "write the golden files anew")

// files is a root in memory.
func files(pairs ...string) fstest.MapFS {
	root := fstest.MapFS{}
	for i := 0; i < len(pairs); i += 2 {
		root[pairs[i]] = &fstest.MapFile{Data: []byte(pairs[i+1])}
	}
	return root
}

// compile compiles a file of a root and lets panics through.
func compile(root fstest.MapFS, path string) *Sheet {
	return Compile(&Context{FS: root, Panics: true}, path)
}

// calc puts front matter before a text.
func calc(body string) string { return "---\ncalc: C-1\n---\n" + body }

// report lists diagnostics with what their text does not show.
func report(list []diag.Diagnostic) string {
	var b strings.Builder
	for _, d := range list {
		j := d.JSON()
		fmt.Fprintf(&b, "%s %s, columns %d to %d\n%s", j.Severity, j.ID, j.Column, j.EndColumn, d.Text())
	}
	return b.String()
}

// Each file of testdata/faults is a root whose calc.md has the mistakes that its
// name says; the part `want` is what is reported.
func TestFaults(t *testing.T) {
	cases, err := filepath.Glob("testdata/faults/*.txtar")
	if err != nil || len(cases) == 0 {
		t.Fatal("no cases", err)
	}
	for _, name := range cases {
		t.Run(strings.TrimSuffix(filepath.Base(name), ".txtar"), func(t *testing.T) {
			archive, err := txtar.ParseFile(name)
			if err != nil {
				t.Fatal(err)
			}
			root, want := fstest.MapFS{}, ""
			kept := archive.Files[:0:0]
			for _, f := range archive.Files {
				if f.Name == "want" {
					want = string(f.Data)
					continue
				}
				kept = append(kept, f)
				root[f.Name] = &fstest.MapFile{Data: f.Data}
			}
			got := report(compile(root, "calc.md").Diagnostics)
			if *update {
				archive.Files = append(kept, txtar.File{Name: "want", Data: []byte(got)})
				if err := os.WriteFile(name, txtar.Format(archive), 0o644); err != nil {
					t.Fatal(err)
				}
				return
			}
			if d := cmp.Diff(want, got); d != "" {
				t.Error(d)
			}
		})
	}
}

// What cannot be computed since a helper's own file has a mistake names the
// line of the calc that names the file: a line of another file would mislead.
func TestLineOfHelperFile(t *testing.T) {
	s := compile(files(
		"calc.md", "---\ncalc: C-1\nhelpers: {shop: shop.md}\n---\n```calc\na = shop.bad(3 kN)\nb = 2*a\n```\n",
		"shop.md", "\n\n```helper bad\nx [force]\ny = x + 1 mm\ngives y\n```\n",
	), "calc.md")
	if len(s.Steps) != 2 || !s.Failed() {
		t.Fatal(s.Steps, s.Diagnostics)
	}
	for _, step := range s.Steps {
		if !step.Failed || step.Because != 3 {
			t.Errorf("%s: failed %v because of line %d, want line 3", step.ID, step.Failed, step.Because)
		}
	}
}

// A helper of the author's own file that has several results runs along a plot
// as it runs in the calc.
func TestPlotThroughHelperFile(t *testing.T) {
	s := compile(files(
		"calc.md", "---\ncalc: C-1\nhelpers: {shop: shop.md}\n---\n```calc\nh = 2 mm\nc = shop.cone(h)\nN = 3*c.N_0\n```\n```plot\nN against h from 1 mm to 4 mm\n```\n",
		"shop.md", "\n\n```helper cone\nh [length]\nN_0 [mm^2] = h^2\nu = 2*h\ngives N_0, u\n```\n",
	), "calc.md")
	if s.Failed() {
		t.Fatal(report(s.Diagnostics))
	}
	plot := s.Blocks[len(s.Blocks)-1].Plot
	if plot == nil || len(plot.Curves) != 1 {
		t.Fatalf("plot %v", plot)
	}
	c := plot.Curves[0]
	for i, x := range c.X {
		if want := 3 * x * x; math.Abs(c.Y[i]-want) > 1e-9*want {
			t.Fatalf("N at h = %g mm: got %g mm², want %g mm²", x, c.Y[i], want)
		}
	}
}
