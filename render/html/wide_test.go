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
	s := compileBytes(t, []byte(wide))
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

// carriedCase has a value carried over rows with a long mark, and a root that is
// parted inside its brackets.
const carriedCase = "---\ncalc: T\nfrom: {loads: l.md}\n---\n\n```calc\nN = loads.N  # Pull on an anchor\nm = max(N)\n" +
	"a = 1200 mm  # [d]\nb = 1300.5 mm  # [d]\n" +
	"r = sqrt((a*(a/b - b/a)/(a + b) + b*(b/a + a/b)/(a + b))^2 + (a*(a/b + b/a)/(2*a + b) + b*(b/a + a/b)/(a + 2*b))^2 + (a*(a/b + b/a)/(3*a + b) + b*(b/a + a/b)/(a + 3*b))^2)\n```\n"

// On a telephone a note keeps room beside a long mark; brackets that are
// parted grow with what stands between them.
func TestNarrow(t *testing.T) {
	s := notebook.Compile(&notebook.Context{FS: fstest.MapFS{
		"t.md": {Data: []byte(carriedCase)},
		"l.md": {Data: []byte("---\ncalc: L\n---\n\n```cases\ncase | N [kN]\nC3 short circuit, free end on the left | 12\nC1 | 3\n```\n")},
	}, Panics: true}, "t.md")
	if s.Failed() {
		t.Fatal(s.Diagnostics[0].Text())
	}
	page := html.Append(nil, render.NewPage(s))
	ctx := browser(t)
	for _, width := range []int64{400, 1280} {
		open(t, ctx, page, width)
		for _, found := range evaluate(t, ctx, `for(const n of document.querySelectorAll('.line>.note')){const r=n.getBoundingClientRect();if(n.textContent&&(r.height>60||r.width<60))out.push(n.textContent+': '+r.width+' by '+r.height)}`+
			`const c=[...document.querySelectorAll('mpadded')].map(p=>p.parentNode);if(c.length<2)out.push(c.length+' parted brackets');for(const b of c){const m=b.querySelector('mo').getBoundingClientRect(),s=b.querySelector('mpadded').getBoundingClientRect();if(m.height<0.9*s.height)out.push(b.textContent+' is '+m.height+' tall beside '+s.height)}`+
			`const e=document.querySelector('#v-N .eq').getBoundingClientRect(),o=document.querySelector('#v-N .out').getBoundingClientRect();if(Math.abs(e.top-o.top)>12)out.push('the output starts '+(e.top-o.top)+' above its formula')`) {
			t.Errorf("%d wide: %s", width, found)
		}
	}
}

// On paper, where nothing scrolls, the author's own table of many columns stays
// within its column.
func TestManyColumns(t *testing.T) {
	const table = "---\ncalc: T\n---\n\n| bolt | x [mm] | y [mm] | N [kN] | V_y [kN] | V_z [kN] | F_v [kN] | F_t [kN] | util. | where |\n" +
		"|---|--:|--:|--:|--:|--:|--:|--:|--:|---|\n| B-101 upper left | -170.5 | 75.25 | 112.5 | 64.25 | 12.75 | 65.5 | 112.5 | 0.92 | drawing S-12 |\n"
	s := compileBytes(t, []byte(table))
	ctx := browser(t)
	open(t, ctx, html.Append(nil, render.NewPage(s)), 1280)
	printed(t, ctx)
	for _, found := range evaluate(t, ctx, `const t=document.querySelector('main table').getBoundingClientRect(),m=document.querySelector('.prose .mid').getBoundingClientRect();if(t.right>m.right+1)out.push('the table ends '+(t.right-m.right)+' beyond its column')`) {
		t.Error(found)
	}
}
