package html_test

import (
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/html"
)

// wide has results over rows whose table fills the column, and a value that is
// longer than the output column.
const wide = "---\ncalc: T\nfigures: 5\n---\n\n```cases\ncase | x [MPa] | y [MPa]\nA | 120 | 35\nB | 90 | -10\n```\n\n" +
	"```calc\nstress = plane_stress(sigma_x=x, sigma_y=y, tau_xy=12 MPa)\nJ = torsion_circular(T=2 kN*m, D=70 mm, L=1 m, G=80 GPa)\n```\n"

// The heads of a wide table put their units below their symbols before columns
// are hidden, and a long value parts before its unit, not within it.
func TestWide(t *testing.T) {
	s := notebook.Compile(&notebook.Context{FS: fstest.MapFS{"t.md": {Data: []byte(wide)}}, Panics: true}, "t.md")
	if s.Failed() {
		t.Fatal(s.Diagnostics[0].Text())
	}
	page := html.Append(nil, render.NewPage(s))
	if want := "10<sup>6</sup>\u00a0<wbr>mm⁴"; !strings.Contains(string(page), want) {
		t.Errorf("there is no %q", want)
	}
	ctx := browser(t)
	open(t, ctx, page, 1280)
	for _, found := range evaluate(t, ctx, `const rows=[...document.querySelectorAll('.rows')];if(!rows.some(r=>r.querySelectorAll('th').length>6))out.push('no wide table');for(const r of rows)if(r.scrollWidth>r.clientWidth)out.push(r.scrollWidth+' > '+r.clientWidth+': '+r.textContent.slice(0,80))`) {
		t.Errorf("columns are hidden: %s", found)
	}
}
