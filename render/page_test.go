package render_test

import (
	"flag"
	"os"
	"strconv"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/maths"
)

var update = flag.Bool("update", false, "write the golden files anew")

// compile compiles the lines of a calc block, or a whole file where the text
// has front matter.
func compile(t testing.TB, text string) *notebook.Sheet {
	t.Helper()
	if !strings.HasPrefix(text, "---\n") {
		text = "---\ncalc: T-1\n---\n\n# Only section\n\n```calc\n" + text + "\n```\n"
	}
	s := notebook.Compile(&notebook.Context{FS: fstest.MapFS{"t.md": {Data: []byte(text)}}, Panics: true}, "t.md")
	if s.Failed() {
		t.Fatal(s.Diagnostics[0].Text())
	}
	return s
}

// listing is a page as plain text: what both writers draw, one line for each
// line of a column.
type listing struct{ strings.Builder }

func (l *listing) line(words ...string) {
	text := strings.Join(strings.Fields(strings.Join(words, " ")), " ")
	if text != "" {
		l.WriteString(text)
		l.WriteByte('\n')
	}
}

func plain(n maths.Node) string {
	if n == nil {
		return ""
	}
	return string(maths.AppendPlain(nil, n))
}

func chain(c maths.Chain) string {
	if c.Left == nil && len(c.Steps) == 0 {
		return ""
	}
	return string(maths.AppendPlainChain(nil, c))
}

var kinds = [...]string{"line", "formula", "check", "note", "gap", "definition", "helper", "limit", "table", "drawing"}

func (l *listing) entry(e *render.Entry) {
	if e.Kind == render.Gap {
		return
	}
	number := ""
	if e.Number != "" {
		number = "(" + e.Number + ")"
	}
	l.line(strings.Repeat("> ", e.Indent)+kinds[e.Kind], number, "|", e.Note)
	for _, r := range e.Refs {
		l.line("    ref", r.Text)
	}
	if f := chain(e.Formula); f != "" {
		l.line("    set", f)
	}
	for _, p := range e.Below {
		l.line("    below", p.Before, chain(p.Formula), p.After)
	}
	for _, t := range e.Trials {
		l.line("    tried", t.Value, t.Mark, t.Why, strconv.FormatBool(t.OK))
	}
	for _, t := range e.Tables {
		l.table(t)
	}
	if e.Output != nil {
		l.line("    out", plain(e.Output), e.Mark)
	}
	if v := e.Verdict; v != nil {
		l.line("    verdict", v.Utilisation, v.Word, e.Mark)
	}
}

func (l *listing) table(t *render.Table) {
	var head []string
	for _, h := range t.Heads {
		head = append(head, strings.TrimSpace(h.Words+plain(h.Symbol)+" "+plain(h.Unit)))
	}
	l.line("    table", t.Caption, "|", strings.Join(head, " | "))
	rows := t.Printed
	if rows == nil {
		for i := range t.Rows {
			rows = append(rows, i)
		}
	}
	for _, row := range rows {
		var cells []string
		for col := range t.Heads {
			cell := string(t.AppendCell(nil, row, col))
			if t.Governs(row, col) {
				cell = "*" + cell + "*"
			}
			cells = append(cells, cell)
		}
		l.line("    ", strings.Join(cells, " | "))
	}
	if t.Left() > 0 {
		l.line("    left out", strconv.Itoa(t.Left()))
	}
}

func (l *listing) lists(p *render.Page) {
	for _, s := range p.Lists.Checks {
		reason := ""
		for _, r := range s.Reason {
			reason += r.Before + " " + chain(r.Formula) + " " + r.After
		}
		l.line("summary", s.Number, s.Verdict.Utilisation, s.Verdict.Word, "|", chain(s.Formula), "|", s.Mark, reason)
	}
	for _, u := range p.Lists.Unsourced {
		l.line("unsourced", plain(u.Symbol), plain(u.Value), "|", u.Note)
	}
	for _, r := range append(p.Lists.Assumptions, p.Lists.Holds...) {
		l.line("remark", r.Number, r.Text)
	}
	for _, s := range p.Lists.Symbols {
		l.line("symbol", plain(s.Symbol), "|", plain(s.Unit), "|", s.Meaning, "|", s.Where)
	}
	for _, s := range p.Lists.Sources {
		var on []string
		for _, r := range s.On {
			on = append(on, plain(r.Symbol)+r.Number)
		}
		l.line("source", s.Source, "|", strings.Join(on, ", "))
	}
	for _, c := range p.Lists.Cautions {
		l.line("caution", c.Number, c.Text, "|", strings.Join(c.Helpers, ", "))
	}
	for _, n := range p.Lists.Notes {
		l.line("note", n)
	}
}

func list(p *render.Page) string {
	l := &listing{}
	l.line("title", p.Title.Title, "|", p.Title.Under, "|", p.Title.Firm)
	for _, c := range p.Title.Cells {
		l.line("cell", c.Label, c.Text, c.Date)
	}
	s := p.State
	l.line("state", strconv.Itoa(s.Checks), strconv.Itoa(s.NG), strconv.Itoa(s.NotRequired), strconv.Itoa(s.Holds), strconv.Itoa(s.Assumptions))
	if s.Worst != nil {
		l.line("worst", s.Worst.Number, s.Worst.Verdict.Utilisation)
	}
	for _, b := range p.Blocks {
		for i := range b {
			l.entry(&b[i])
		}
	}
	for _, v := range p.Values {
		text := ""
		for _, part := range v {
			text += part.Words + plain(part.Value)
		}
		l.line("value", text)
	}
	l.lists(p)
	return l.String()
}

// What stands on a page is read through as text.
func TestPage(t *testing.T) {
	for _, name := range []string{"lug", "parts", "rows"} {
		s, err := notebook.Open("html/testdata/" + name + ".md")
		if err != nil {
			t.Fatal(err)
		}
		if s.Failed() {
			t.Fatal(s.Diagnostics[0].Text())
		}
		got, golden := list(render.NewPage(s)), "testdata/"+name+".txt"
		if *update {
			if err := os.WriteFile(golden, []byte(got), 0o666); err != nil {
				t.Fatal(err)
			}
		}
		want, err := os.ReadFile(golden)
		if err != nil {
			t.Fatal(err)
		}
		g, w := strings.Split(got, "\n"), strings.Split(string(want), "\n")
		for i := range max(len(g), len(w)) {
			if i >= len(g) || i >= len(w) || g[i] != w[i] {
				t.Errorf("%s line %d:\n got %s\nwant %s", golden, i+1, append(g, "")[min(i, len(g))], append(w, "")[min(i, len(w))])
				break
			}
		}
	}
}

// The parts of an entry that the notation rules, one by one.
func TestEntries(t *testing.T) {
	for _, c := range []struct{ lines, want string }{
		// a formula without names has no second form, and a copy of a value neither
		{"x = 2*3 mm", "formula (1.1) |\nset x = 2·3 mm\nout 6.000 mm"},
		{"P = 48 kN\nx = P", "line |\nset P = 48 kN\nformula (1.1) |\nset x = P\nout 48.00 kN"},
		{"P = 48 kN\nx [N] = P", "line |\nset P = 48 kN\nformula (1.1) |\nset x = P = 48 kN\nout 48000 N"},
		// the utilisation never contradicts the verdict
		{"check 1.0001 mm <= 1 mm", "check (1.1) |\nset 1.0001 mm ≤ 1 mm\nverdict 1.01 NG"},
		{"check 0.9999 mm <= 1 mm", "check (1.1) |\nset 0.9999 mm ≤ 1 mm\nverdict 1.00 OK"},
		{"check 1 mm < 1 mm", "check (1.1) |\nset 1 mm < 1 mm\nverdict 1.00, equal NG"},
		{"check 0 mm <= 1 mm", "check (1.1) |\nset 0 mm ≤ 1 mm\nverdict OK"},
		{"check 1 mm <= -1 mm", "check (1.1) |\nset 1 mm ≤ −1 mm\nverdict NG"},
		{"check 1 mm == 1 mm", "check (1.1) |\nset 1 mm = 1 mm\nverdict OK"},
		{"a = 3 mm\ncheck 1 mm <= a <= 2*a", "line |\nset a = 3 mm\ncheck (1.1) |\nset 1 mm ≤ a = 3 mm ≤ 2·a = 2·3 mm = 6.000 mm\nverdict 0.50 OK"},
		// a choice tells what decided
		{"t = 30 mm\nk = 0.85 if t <= 25 mm\n  = 0.75 otherwise", "line |\nset t = 30 mm\nformula (1.1) |\nset k = {0.85 if t ≤ 25 mm; 0.75 otherwise ←}\nbelow with t = 30 mm\nout 0.7500"},
		// a text, a feet-and-inches length, a percentage
		{"g = \"S355\"\nL = 12 ft 6 in\nq = 5 %", "line |\nset g = S355\nline |\nset L = 12 ft 6 in\nline |\nset q = 5 %"},
	} {
		l := &listing{}
		for _, b := range render.NewPage(compile(t, c.lines)).Blocks {
			for i := range b {
				l.entry(&b[i])
			}
		}
		if got := strings.TrimSpace(l.String()); got != c.want {
			t.Errorf("%s\n got:\n%s\nwant:\n%s", c.lines, got, c.want)
		}
	}
}

// Figures within texts are set as everywhere on a page: the true minus, ×10ⁿ.
func TestFiguresWithinTexts(t *testing.T) {
	p := render.NewPage(compile(t, "---\ncalc: T-1\n---\n\n# From {a}\n\n> Hold: At least {a}, at most {b}.\n\n"+
		"```calc\na = -2.5 mm\nb = 2.1E5 MPa\nx = first of -5 mm, 1e3 mm with x >= a/1e6\ncheck 1e12 mm <= 2 mm\n```\n\n"+
		"```schedule s\nmark | u [mm] | v\nA-1 | -1.5E3 | HEB-1e3\nA-2 | 1/2 | B\n```\n"))
	x := p.Blocks[0][2]
	if got := x.Trials[0].Value + " " + x.Trials[0].Why; got != "−5.000 mm −5.000 mm < −2.500×10⁻⁶ mm" {
		t.Errorf("first trial is %s", got)
	}
	if got := x.Trials[1].Value + " " + x.Trials[1].Why; got != "1×10³ mm 1000 mm ≥ −2.500×10⁻⁶ mm" {
		t.Errorf("second trial is %s", got)
	}
	if got := p.Blocks[0][3].Verdict.Utilisation; got != "5.00×10¹¹" {
		t.Errorf("utilisation is %s", got)
	}
	cell := func(row, col int) string { return string(p.Blocks[1][0].Tables[0].AppendCell(nil, row, col)) }
	if got := cell(0, 1) + " " + cell(1, 1) + " " + cell(0, 2); got != "−1.5×10³ 1/2 HEB-1e3" {
		t.Errorf("cells are %s", got)
	}
	if got := p.Lists.Holds[0].Text; got != "At least −2.5 mm, at most 2.1×10⁵ MPa." {
		t.Errorf("the hold is listed as %s", got)
	}
	if got := p.Sheet.Headings[0].Text; got != "From −2.5 mm" {
		t.Errorf("the heading is listed as %s", got)
	}
}

// The summary has NG first, then falling ratios, those without one, and last
// those that are not required.
func TestSummary(t *testing.T) {
	p := render.NewPage(compile(t, `a = 3 mm
check a <= 4 mm
check a == 3 mm
check a <= 2 mm if a > 5 mm
check a <= 2 mm
check a == 4 mm
check a <= 3.1 mm
check a <= 1 mm`))
	var got []string
	for _, s := range p.Lists.Checks {
		got = append(got, s.Number+" "+s.Verdict.Utilisation+" "+s.Verdict.Word)
	}
	want := "1.7 3.00 NG, 1.4 1.50 NG, 1.5  NG, 1.6 0.97 OK, 1.1 0.75 OK, 1.2  OK, 1.3  not required"
	if strings.Join(got, ", ") != want {
		t.Errorf("got %s\nwant %s", strings.Join(got, ", "), want)
	}
	if s := p.State; s.Checks != 7 || s.NG != 3 || s.NotRequired != 1 || s.Worst == nil || s.Worst.Number != "1.7" {
		t.Errorf("state %+v", s)
	}
}

func TestBar(t *testing.T) {
	for _, c := range []struct {
		v      *render.Verdict
		fill   float64
		beyond bool
		ok     bool
	}{
		{nil, 0, false, false},
		{&render.Verdict{Required: true, Ratio: 0.5, Utilisation: "0.50"}, 0.4, false, true},
		{&render.Verdict{Required: true, Ratio: 1, Utilisation: "1.00"}, render.BarTick, false, true},
		{&render.Verdict{Required: true, Ratio: 40, Utilisation: "40.00"}, 1, true, true},
		{&render.Verdict{Required: true}, 0, false, false},
		{&render.Verdict{Ratio: 0.5, Utilisation: "0.50"}, 0, false, false},
	} {
		if fill, beyond, ok := c.v.Bar(); fill != c.fill || beyond != c.beyond || ok != c.ok {
			t.Errorf("%+v: got %v, %v, %v", c.v, fill, beyond, ok)
		}
	}
}

// A page without checks, sources, remarks or cautions has none of their lists.
func TestListsAreAbsent(t *testing.T) {
	l := render.NewPage(compile(t, "---\ncalc: T-1\n---\n\nOnly words.\n")).Lists
	if len(l.Checks)+len(l.Unsourced)+len(l.Assumptions)+len(l.Holds)+len(l.Sources)+len(l.Cautions)+len(l.Symbols) > 0 {
		t.Errorf("%+v", l)
	}
	if len(l.Notes) != 3 {
		t.Errorf("%d standing notes", len(l.Notes))
	}
}
