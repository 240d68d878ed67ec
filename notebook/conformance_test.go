package notebook_test

import (
	"encoding/json"
	"fmt"
	"math"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"testing/fstest"

	"github.com/rogpeppe/go-internal/txtar"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// Each file of testdata/conformance at the top of the project holds one rule of
// the notation, in words at its head, then the files of a root, then what its
// calc.md has to come to, a line each in the part `want`:
//
//	bytes crlf bom                                   how calc.md is written, where not plain
//	file other.md                                    the file that is compiled, where not calc.md
//	exit 0                                           the exit status of `gusset run`
//	value {"name": "tau", "value": 48.89}            keys of an entry of `values`
//	check {"ok": true, "utilisation": 0.509}         keys of the next entry of `checks`
//	error {"id": "syntax", "line": 7, "under": "x"}  keys of the next error or warning; hints are one text
//	note {"id": "no-source", "under": "x"}           keys of any note
//	absent tau                                       a name that no value has
//	reads 48.89 MPa                                  the next value in text, as it is printed
//
// Errors and warnings have to be these and no others, in this order. A text of
// a message or a hint matches where it is contained; a decimal number matches
// within half a unit of its last written figure, a whole number within 1e-9.
// `under` is the text that is underlined.
func TestConformance(t *testing.T) {
	cases, err := filepath.Glob("../testdata/conformance/*.txtar")
	if err != nil || len(cases) < 100 {
		t.Fatal(len(cases), "cases", err)
	}
	for _, name := range cases {
		t.Run(strings.TrimSuffix(filepath.Base(name), ".txtar"), func(t *testing.T) {
			archive, err := txtar.ParseFile(name)
			if err != nil {
				t.Fatal(err)
			}
			if strings.TrimSpace(string(archive.Comment)) == "" {
				t.Error("the file names no rule")
			}
			newConformance(t, archive).run()
		})
	}
}

type conformance struct {
	t     *testing.T
	root  fstest.MapFS
	file  string
	want  []string
	found foundJSON
	sheet *notebook.Sheet
}

// foundJSON is what the program prints for a machine.
type foundJSON struct {
	Values, Checks, Diagnostics []map[string]any
}

func newConformance(t *testing.T, archive *txtar.Archive) *conformance {
	c := &conformance{t: t, root: fstest.MapFS{}, file: "calc.md"}
	for _, f := range archive.Files {
		if f.Name == "want" {
			c.want = strings.Split(strings.TrimSpace(string(f.Data)), "\n")
			continue
		}
		c.root[f.Name] = &fstest.MapFile{Data: f.Data}
	}
	kept := c.want[:0:0]
	for _, line := range c.want {
		switch verb, rest, _ := strings.Cut(line, " "); verb {
		case "bytes":
			c.rewrite(strings.Fields(rest))
		case "file":
			c.file = rest
		default:
			kept = append(kept, line)
		}
	}
	c.want = kept
	return c
}

// rewrite gives calc.md the bytes that a text archive cannot hold.
func (c *conformance) rewrite(how []string) {
	f := c.root["calc.md"]
	for _, h := range how {
		switch h {
		case "crlf":
			f.Data = []byte(strings.ReplaceAll(string(f.Data), "\n", "\r\n"))
		case "bom":
			f.Data = append([]byte("\uFEFF"), f.Data...)
		case "unquoted": // Go's escapes in the text stand for their characters
			text, err := strconv.Unquote(`"` + strings.NewReplacer("\n", `\n`, `"`, `\"`).Replace(string(f.Data)) + `"`)
			if err != nil {
				c.t.Fatal(err)
			}
			f.Data = []byte(text)
		default:
			c.t.Fatalf("bytes: no way to write %q", h)
		}
	}
}

func (c *conformance) run() {
	c.sheet = notebook.Compile(&notebook.Context{FS: c.root, Panics: true}, c.file)
	out := c.sheet.JSON()
	if err := json.Unmarshal(out, &c.found); err != nil {
		c.t.Fatal(err)
	}
	for _, d := range c.found.Diagnostics {
		d["under"] = c.under(d)
		if hints, ok := d["hints"].([]any); ok {
			d["hints"] = strings.Trim(fmt.Sprint(hints...), "[]")
		}
	}
	checks, faults, refs := c.found.Checks, c.faults(), c.sheet.Refs
	for _, line := range c.want {
		verb, rest, _ := strings.Cut(line, " ")
		switch verb {
		case "exit":
			if got := fmt.Sprint(notebook.Status(c.sheet)); got != rest {
				c.t.Errorf("exit status %s, want %s", got, rest)
			}
		case "value":
			c.value(rest)
		case "check":
			checks = c.next(checks, rest, "check")
		case "error", "warning":
			faults = c.next(faults, fmt.Sprintf(`{"severity": %q, %s`, verb, rest[1:]), verb)
		case "note":
			c.note(rest)
		case "absent":
			for _, v := range c.found.Values {
				if v["name"] == rest {
					c.t.Errorf("%s is listed with the value %v", rest, v["value"])
				}
			}
		case "reads":
			if len(refs) == 0 {
				c.t.Errorf("no further value in text, want %q", rest)
				continue
			}
			if refs[0].Text != rest {
				c.t.Errorf("a value in text reads %q, want %q", refs[0].Text, rest)
			}
			refs = refs[1:]
		default:
			c.t.Errorf("want: %q says nothing", line)
		}
	}
	for _, d := range faults {
		c.t.Errorf("not expected: %v %v at %q, line %v: %v; %v", d["severity"], d["id"], d["under"], d["line"], d["message"], d["hints"])
	}
	if c.t.Failed() {
		for _, d := range c.sheet.Diagnostics {
			if d.Severity != diag.Note {
				c.t.Log(d.Text())
			}
		}
	}
}

// faults are the errors and warnings found.
func (c *conformance) faults() []map[string]any {
	var list []map[string]any
	for _, d := range c.found.Diagnostics {
		if d["severity"] != "note" {
			list = append(list, d)
		}
	}
	return list
}

// under is the text between a diagnostic's columns, counted in code points.
func (c *conformance) under(d map[string]any) string {
	f, ok := c.root[fmt.Sprint(d["file"])]
	if !ok {
		return ""
	}
	lines := strings.Split(strings.TrimPrefix(string(f.Data), "\uFEFF"), "\n")
	n := int(d["line"].(float64)) - 1
	if n >= len(lines) {
		return ""
	}
	line := []rune(lines[n])
	start, end := int(d["column"].(float64))-1, int(d["end_column"].(float64))-1
	if start > len(line) || end > len(line) || start > end {
		return fmt.Sprintf("columns %d to %d of %d", start+1, end+1, len(line))
	}
	return string(line[start:end])
}

// value looks for the entry with the name that is wanted.
func (c *conformance) value(fragment string) {
	want := c.fragment(fragment)
	for _, v := range c.found.Values {
		if v["name"] == want["name"] {
			c.compare(v, want, fmt.Sprint(want["name"]))
			return
		}
	}
	c.t.Errorf("there is no value %v", want["name"])
}

func (c *conformance) note(fragment string) {
	want := c.fragment(fragment)
	for _, d := range c.found.Diagnostics {
		if d["severity"] == "note" && d["id"] == want["id"] && (want["under"] == nil || want["under"] == d["under"]) {
			c.compare(d, want, "note")
			return
		}
	}
	c.t.Errorf("there is no note %s", fragment)
}

// next compares the first of a list and returns the rest.
func (c *conformance) next(list []map[string]any, fragment, what string) []map[string]any {
	if len(list) == 0 {
		c.t.Errorf("no further %s, want %s", what, fragment)
		return nil
	}
	c.compare(list[0], c.fragment(fragment), what)
	return list[1:]
}

func (c *conformance) fragment(text string) map[string]any {
	d := json.NewDecoder(strings.NewReader(text))
	d.UseNumber()
	var want map[string]any
	if err := d.Decode(&want); err != nil {
		c.t.Fatalf("want: %s: %v", text, err)
	}
	return want
}

func (c *conformance) compare(got, want map[string]any, what string) {
	for key, w := range want {
		g, ok := got[key]
		contained := false
		if key == "message" || key == "hints" {
			gs, _ := g.(string)
			contained = strings.Contains(gs, fmt.Sprint(w))
		}
		if (w == nil || ok) && (contained || same(g, w)) {
			continue
		}
		c.t.Errorf("%s: %s is %v, want %v", what, key, g, w)
	}
}

// same compares decoded JSON with what is wanted.
func same(got, want any) bool {
	switch w := want.(type) {
	case json.Number:
		g, ok := got.(float64)
		x, err := w.Float64()
		if !ok || err != nil {
			return false
		}
		return math.Abs(g-x) <= max(halfLast(w.String()), 1e-9*math.Abs(x))
	case []any:
		g, ok := got.([]any)
		if !ok || len(g) != len(w) {
			return false
		}
		for i := range w {
			if !same(g[i], w[i]) {
				return false
			}
		}
		return true
	}
	return got == want
}

// halfLast is half a unit of the last figure of a decimal number.
func halfLast(text string) float64 {
	mantissa, exponent, _ := strings.Cut(strings.ToLower(text), "e")
	_, decimals, found := strings.Cut(mantissa, ".")
	if !found {
		return 0
	}
	e, _ := strconv.Atoi(exponent)
	return 0.5000001 * math.Pow(10, float64(e-len(decimals)))
}
