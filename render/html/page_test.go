package html_test

import (
	"os"
	"path/filepath"
	"testing"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/html"
)

// compile compiles a fixture, which has no errors.
func compile(t testing.TB, file string) *notebook.Sheet {
	t.Helper()
	s, err := notebook.Open(file)
	if err != nil {
		t.Fatal(err)
	}
	if s.Failed() {
		for _, d := range s.Diagnostics {
			t.Error(d.Text())
		}
		t.FailNow()
	}
	return s
}

func write(t testing.TB, file string) []byte {
	t.Helper()
	return html.Append(nil, render.NewPage(compile(t, file)))
}

// pages are the calcs that every test of the whole page goes over.
func pages(t testing.TB) []string {
	t.Helper()
	var files []string
	for _, pattern := range []string{"testdata/*.md", "../../examples/*.md"} {
		list, err := filepath.Glob(pattern)
		if err != nil {
			t.Fatal(err)
		}
		for _, f := range list {
			if text, err := os.ReadFile(f); err == nil && notebook.IsCalc(text) {
				files = append(files, f)
			}
		}
	}
	if len(files) == 0 {
		t.Fatal("no calcs")
	}
	return files
}

// faults are what is looked for in a page as a browser shows it.
var faults = []struct{ what, script string }{
	{"there are no formulas", `if(!document.querySelector('math'))out.push('')`},
	{"a formula has no size", `for(const m of document.querySelectorAll('math')){const r=m.getBoundingClientRect();if(r.width<1||r.height<1)out.push(m.outerHTML.slice(0,300))}`},
	{"a numerator stands below its denominator", `for(const f of document.querySelectorAll('mfrac')){const a=f.children[0].getBoundingClientRect(),b=f.children[1].getBoundingClientRect();if(!(a.bottom<=b.top+1&&a.height>0&&b.height>0))out.push(f.outerHTML.slice(0,300))}`},
	{"a link leads nowhere", `for(const a of document.querySelectorAll('a[href^="#"]'))if(!document.getElementById(decodeURIComponent(a.getAttribute('href').slice(1))))out.push(a.outerHTML.slice(0,200))`},
	{"an id stands twice", `const seen=new Set();for(const e of document.querySelectorAll('[id]')){if(seen.has(e.id))out.push(e.id);seen.add(e.id)}`},
	{"the page runs over its side", `const d=document.documentElement;if(d.scrollWidth>d.clientWidth)out.push(d.scrollWidth+' > '+d.clientWidth)`},
	{"something runs over the side of its column", `for(const e of document.querySelectorAll('.row>*,.row>.more>*')){const r=e.getBoundingClientRect(),p=e.parentElement.getBoundingClientRect();if(r.right>p.right+1)out.push(r.right+' > '+p.right+': '+e.outerHTML.slice(0,200))}`},
	{"a value's derivation is not shown while it has the focus", `const a=document.querySelector('a[data-tip]');if(a){a.focus();const s=getComputedStyle(a,'::after');if(!s.content.includes('=')||s.position!=='fixed')out.push(s.content)}`},
	{"a face was not found", `for(const f of document.fonts)if(f.status==='error')out.push(f.family)`},
}

// Shown in a browser, formulas have room, nothing runs over the side of the
// window or of the paper, every link leads somewhere, and nothing is fetched.
func TestChromium(t *testing.T) {
	ctx := browser(t)
	for _, file := range pages(t) {
		page := write(t, file)
		for _, width := range []int64{1280, 400} {
			open(t, ctx, page, width)
			for _, f := range faults {
				for _, found := range evaluate(t, ctx, f.script) {
					t.Errorf("%s at %d px: %s: %s", filepath.Base(file), width, f.what, found)
				}
			}
		}
		printed(t, ctx)
		for _, f := range overPaper {
			for _, found := range evaluate(t, ctx, f.script) {
				t.Errorf("%s on paper: %s: %s", filepath.Base(file), f.what, found)
			}
		}
	}
}

var overPaper = []struct{ what, script string }{
	{"the page runs over its side", faults[5].script},
	{"a result does not stand beside the last line of its formula", `for(const r of document.querySelectorAll('.formula:has(>.out>b)')){const m=[...r.querySelectorAll('.two>span>:last-child>math')].pop();if(!m)continue;const o=r.querySelector('.out>b').getBoundingClientRect(),l=m.getBoundingClientRect();if(o.bottom<l.top||o.top>l.bottom)out.push(r.textContent.slice(0,200))}`},
	{"a formula runs over the side of its column", `for(const e of document.querySelectorAll('.row math,.row td')){const c=e.closest('.row>*').getBoundingClientRect(),r=e.getBoundingClientRect();if(r.right>c.right+1)out.push(r.right+' > '+c.right+': '+e.textContent.slice(0,200)+e.outerHTML.slice(0,300))}`},
}
