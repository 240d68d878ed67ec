package syntax

import (
	"fmt"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gusset/notebook/diag"
)

// fenceMistakes are whole fences with one mistake each: its id and the text
// underlined. Columns and rows are named by what stands in them.
var fenceMistakes = []struct{ info, content, id, under string }{
	{"calc loud", "a = 1", "syntax", "loud"},
	{"calc brief, full", "a = 1", "syntax", "brief,"},
	{"helper", "V [force]\ntau = V\ngives tau", "syntax", ""},
	{"helper a.b", "V [force]\ngives V", "syntax", "a.b"},
	{"helper a b", "V [force]\ngives V", "syntax", "b"},
	{"helper if", "V [force]\ngives V", "syntax", "if"},
	{"helper h", "V [force]\nx = 2*V", "syntax", "h"},
	{"helper h", "V\nx = 2*V\ngives x", "syntax", "V"},
	{"helper h", "V [force]\nx = 2*V\nd [length]\ngives x", "syntax", "d [length]"},
	{"helper h", "V [forse]\nx = 2*V\ngives x", "unknown-unit", "forse"},
	{"helper h", "n = 1e400\nV [force]\nx = 2*V\ngives x", "not-a-number", "1e400"},
	{"helper h", "V [force]\ncheck V > 3 kN\ngives V", "syntax", "check"},
	{"helper h", "V [force]\nneeds V\ngives V", "syntax", "V"},
	{"helper h", "V [force]\nneeds V > 3 kN else stop\ngives V", "syntax", "else"},
	{"helper h", "V [force]\ngives", "syntax", "gives"},
	{"helper h", "V [force]\ngives V, V", "syntax", "V"},
	{"helper h", "V [force]\ngives 3", "syntax", "gives"},
	{"helper h", "V [force]\ngives V\ngives V", "syntax", "gives V"},
	{"schedule", "a | b", "syntax", ""},
	{"schedule if", "a | b", "syntax", "if"},
	{"schedule 2x", "a | b", "syntax", "2x"},
	{"schedule s t", "a | b", "syntax", "t"},
	{"schedule s from", "", "syntax", "from"},
	{"schedule s from a.csv b.csv", "", "syntax", "b.csv"},
	{"schedule s from a.csv", "a | b", "syntax", "a | b"},
	{"schedule s", "", "syntax", "```schedule s\n"},
	{"schedule s", "a | | b", "syntax", ""},
	{"schedule s", "a | x mm", "syntax", "mm"},
	{"schedule s", "a | x [mmm]", "unknown-unit", "mmm"},
	{"schedule s", "a | x [length]", "syntax", "[length]"},
	{"schedule s", "a | at", "syntax", "at"},
	{"schedule s", "a | x.y", "syntax", "x.y"},
	{"schedule s", "a | 2x", "syntax", "2x"},
	{"schedule s", "a | x\nm | 3 | 4 | 5", "syntax", "m | 3 | 4 | 5"},
	{"schedule s", "a | x\nm", "syntax", "m"},
	{"plot", "", "syntax", "```plot\n"},
	{"plot tau", "", "syntax", "tau"},
	{"plot", "tau against d", "syntax", "d"},
	{"plot", "tau from 1 to 2", "syntax", "from"},
	{"plot", "tau against d from 1", "syntax", "1"},
	{"plot", "tau against 3 from 1 to 2", "syntax", "against"},
	{"plot", "tau against d from 1 to 2 mm until", "syntax", "2 mm until"},
	{"plot", "tau, against d from 1 to 2", "syntax", "d"},
	{"plot", "2*tau against d from 1 to 2", "syntax", "2"},
	{"plot", "tau against d from 1 to 2\nsigma against d from 1 to 2", "syntax", "sigma"},
	{"plot checks", "limit 3 mm", "syntax", "3"},
	{"plot checks", "limit", "syntax", "limit"},
	{"plot checks", "steps many", "syntax", "many"},
	{"plot checks", "steps", "syntax", "steps"},
	{"plot checks", "steps 0", "syntax", "0"},
	{"plot checks", "steps 1.5", "syntax", "1"},
	{"plot checks", "steps 20000", "bound-exceeded", "20000"},
	{"plot checks", "title A\ntitle B", "syntax", "title B"},
	{"plot checks", "plot all", "syntax", "plot"},
	{"figure", "", "syntax", ""},
	{"figure mohr a,", "", "syntax", ","},
	{"figure mohr a b", "", "syntax", "a b"},
	{"figure mohr a < b", "", "syntax", "a < b"},
	{"figure mohr a over b", "", "syntax", "b"},
}

func TestFenceMistakes(t *testing.T) {
	for _, test := range fenceMistakes {
		content := test.content
		if content != "" {
			content += "\n"
		}
		src, parse := fenced(test.info, content)
		b, diags := parse()
		if fault := checkBlock(src, b, diags); fault != "" {
			t.Errorf("%s\n%s: %s", test.info, test.content, fault)
		}
		if len(diags) != 1 || diags[0].ID != test.id || src.Slice(diags[0].Span) != test.under {
			t.Errorf("%s\n%s\nwant %s at %q, got %d:", test.info, test.content, test.id, test.under, len(diags))
			for _, d := range diags {
				t.Logf("%s %s", d.ID, d.Text())
			}
		}
	}
}

// One lost bracket is one mistake; what stands below is read.
func TestRecovery(t *testing.T) {
	tests := []struct{ source, want string }{
		{"x = max(a, (b\ny = 3", "bad x/def y 3"},
		{"x = (a + b\n+ c\nf(a) [mm] = 3", "bad x/def f(a) [mm] 3"},
		{"x = (a\ncheck a < b", "bad x/check (a < b)"},
		{"x = (a\n\ny = 3", "bad x/gap/def y 3"},
		{"x = (a\n// remark\ny == 3)\nz = 3", "bad x/bad y/def z 3"},
		{"x = (a\n= 4 otherwise\ny = 3", "bad x/def y 3"},
		{"x = a @ b if a < b\n= 4 otherwise\nwhere d [mm]\ny = 3", "bad x/def y 3"},
		{"k [kips] = a if a < b\n= 4 otherwise\ny = 3", "bad k/def y 3"},
		{"x = f(a,\nb = 3,\nc = 4", "bad x"},
		{"x = max(a @ b,\nc)\ny = 3", "bad x/def y 3"},
		{"x = a[3\ny [mm] = 3", "bad x/def y [mm] 3"},
		{"x = \"abc\ny = 3", "bad x/def y 3"},
	}
	for _, test := range tests {
		_, b, diags := parseCalc(test.source)
		var out strings.Builder
		if err := Dump(&out, b); err != nil {
			t.Fatal(err)
		}
		lines := strings.Split(strings.TrimSpace(out.String()), "\n")[1:]
		for i := range lines {
			lines[i] = strings.TrimSpace(lines[i])
		}
		got := strings.Join(lines, "/")
		if got != test.want || len(diags) != strings.Count(test.want, "bad") {
			t.Errorf("%q: got %s with %d mistakes, want %s", test.source, got, len(diags), test.want)
		}
	}
}

// Several mistakes in a block are all found in one run.
func TestEveryMistake(t *testing.T) {
	_, _, diags := parseCalc("a = 48 kips\nb = 1,200\nok = 3\nc = (2\nd = 3 x")
	var got []string
	for _, d := range diags {
		line, column := d.Source.Position(d.Span.Start)
		got = append(got, fmt.Sprintf("%d:%d %s", line, column, d.ID))
	}
	want := []string{"2:8 wrong-unit-spelling", "3:5 syntax", "5:5 syntax", "6:5 unknown-unit"}
	if diff := cmp.Diff(want, got); diff != "" {
		t.Error(diff)
	}
}

// A fence in a quote or a list has lines that are not contiguous; places are
// those of the file.
func TestLinesInQuote(t *testing.T) {
	text := "> ```calc\n> x = f(a, # note\n>   b)\n> check x <=\n>  3 mm\n> y = 2 q\n> ```\n"
	src := diag.NewSource("quote.md", []byte(text))
	var lines []Line
	for _, s := range []string{"x = f(a, # note", "  b)", "check x <=", " 3 mm", "y = 2 q"} {
		i := strings.Index(text, s)
		lines = append(lines, Line{i, i + len(s)})
	}
	info := strings.Index(text, "calc")
	b, diags := NewReader(src, len(src.Text)).Block(diag.Span{Start: info, End: info + 4}, diag.Span{Start: 2, End: len(text)}, lines)
	if len(diags) != 1 || src.Slice(diags[0].Span) != "2 q" {
		t.Fatalf("diagnostics %v", diags)
	}
	if line, column := src.Position(diags[0].Span.Start); line != 6 || column != 7 {
		t.Errorf("the mistake is at %d:%d", line, column)
	}
	x := b.Stmts[0].(*Definition)
	if got := Print(src, x.Branches[0].Value); got != "f(a, b)" || x.Note.Text != "note" {
		t.Errorf("got %q, note %q", got, x.Note.Text)
	}
	if got := Print(src, b.Stmts[1].(*Check).Cond); got != "x <= 3 mm" {
		t.Errorf("got %q", got)
	}
}

// Line endings of another system change nothing.
func TestCarriageReturns(t *testing.T) {
	for _, test := range blockTests {
		want := tree(t, test.info, test.content)
		if got := tree(t, test.info, strings.ReplaceAll(test.content, "\n", "\r\n")); got != want {
			t.Errorf("%s: got\n%s\nwant\n%s", test.name, got, want)
		}
	}
}

func TestWarningKeepsStatement(t *testing.T) {
	for _, source := range []string{"c = 3 J/kg*K", "c [J/kg*K] = a"} {
		src, b, diags := parseCalc(source)
		if len(diags) != 1 || diags[0].Severity != diag.Warning || diags[0].ID != diag.AmbiguousUnit || src.Slice(diags[0].Span) != "J/kg*K" {
			t.Errorf("%s: %v", source, diags)
		}
		if _, ok := b.Stmts[0].(*Definition); !ok {
			t.Errorf("%s: %T", source, b.Stmts[0])
		}
		if got := corrections(diags[0]); !cmp.Equal(got, []string{"J/(kg*K)", "J*K/kg"}) {
			t.Errorf("%s: shows %q", source, got)
		}
	}
}

func TestMeant(t *testing.T) {
	for info, want := range map[string]string{
		"Calc": "calc", " CALC brief": "calc", "Schedule bolts # Bolts": "schedule", "PLOT#x": "plot", "calc": "", "calcs": "", "go": "", "": "", "Calc\u212a": "",
	} {
		kind, at := Meant(info)
		if kind != want || !strings.EqualFold(info[at.Start:at.End], want) {
			t.Errorf("Meant(%q) = %q at %v", info, kind, at)
		}
	}
}

func TestIsOurs(t *testing.T) {
	for info, want := range map[string]bool{
		"calc": true, "calc brief": true, " calc": true, "helper direct_shear # x": true, "schedule bolts": true,
		"cases": true, "cases wind": true, "plot": true, "plot#x": true, "figure mohr": true,
		"": false, "calcs": false, "Calc": false, "go": false, "{calc}": false, "calc,": false,
	} {
		if got := IsOurs(info); got != want {
			t.Errorf("IsOurs(%q) = %v", info, got)
		}
	}
}

// Pathological sizes: one diagnostic that names the bound, in linear time (see
// BenchmarkNesting), and no statement lost beside it.
func TestBounds(t *testing.T) {
	const n = 50_000
	var distinct strings.Builder
	for i := range n {
		fmt.Fprintf(&distinct, "a%d [mm], ", i)
	}
	distinct.WriteString("b [mm]")
	for name, source := range map[string]string{
		"brackets":        strings.Repeat("(", n) + "1" + strings.Repeat(")", n),
		"open brackets":   strings.Repeat("(", n) + "1",
		"calls":           strings.Repeat("f(", n) + "1" + strings.Repeat(")", n),
		"named arguments": strings.Repeat("f(a=", n) + "1" + strings.Repeat(")", n),
		"minus signs":     strings.Repeat("-", n) + "1",
		"powers":          "2" + strings.Repeat("^2", n),
		"roots":           strings.Repeat("√", n) + "2",
		"not":             "1 if " + strings.Repeat("not ", n) + "a < b",
		"terms":           "1" + strings.Repeat(" + 1", n),
		"marks":           "a" + strings.Repeat(" at a", n),
		"arguments":       "max(1" + strings.Repeat(", 1", n) + ")",
		"candidates":      "first of 1" + strings.Repeat(", 1", n) + " with x > 0",
		"where":           "a where " + distinct.String(),
		"comparisons":     "1 if 1" + strings.Repeat(" < 1", n),
		"name":            strings.Repeat("a", n),
		"dots":            strings.Repeat("a.", n) + "a",
		"Greek name":      strings.Repeat("τ", n),
		"figures":         strings.Repeat("1", n) + "e-49900",
	} {
		_, b, diags := parseCalc("x = " + source + "\ny = 3")
		if len(diags) != 1 || diags[0].ID != diag.BoundExceeded && diags[0].ID != diag.NotANumber {
			t.Errorf("%s: %d diagnostics", name, len(diags))
			for _, d := range diags[:min(3, len(diags))] {
				t.Log(d.Text())
			}
			continue
		}
		if len(b.Stmts) != 2 || len(diags[0].Message) > 200 {
			t.Errorf("%s: %d statements, message %q", name, len(b.Stmts), diags[0].Message)
		}
	}
	within := strings.Repeat("(", maxDepth) + "1" + strings.Repeat(")", maxDepth)
	if _, _, diags := parseCalc("x = " + within); len(diags) > 0 {
		t.Error("the bound itself is refused")
	}
	if _, _, diags := parseCalc("x = 1" + strings.Repeat(" + 1", maxOperators)); len(diags) > 0 {
		t.Error("the bound of operators itself is refused")
	}
}
