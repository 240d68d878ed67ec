package notebook

import (
	"fmt"
	"slices"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook/diag"
)

// beside are the files that the reference's examples name.
func beside(t *testing.T) fstest.MapFS {
	root := files(
		"loads.md", "---\ncalc: C-101\n---\n\n```calc\nP_u = 48 kN   # Pull [load schedule]\n```\n",
		"shop.md", "# The shop's\n\n```helper bracket  # Load of one of several brackets [shop practice]\nP [force]\nn [number]\nF [force] = P/n  # Share\ngives F\n```\n",
		"plates.csv", "# Source: store list\nmark,f_y [MPa]\nS235,235\nS355,355\n",
	)
	root["logo.png"] = &fstest.MapFile{Data: pngOf(t, 4, 4)}
	return root
}

// example is what one part shows: a file put together from its blocks, and the
// lines that it calls wrong with the ids they draw.
type example struct {
	front, body string
	wrong       [][2]string
}

// examplesIn gathers the examples of a part. A block in front matter begins a
// file of its own.
func examplesIn(t testing.TB, part NotationPart) []example {
	list := []example{{front: "---\ncalc: C-1\n---\n"}}
	lines := strings.Split(part.Text, "\n")
	for i := 0; i < len(lines); i++ {
		open := lines[i]
		if open != "```calc" && open != "```wrong" && open != "~~~~markdown" {
			continue
		}
		end := i + 1 + slices.Index(lines[i+1:], strings.TrimRight(open, "calwrongmkd"))
		content := strings.Join(lines[i+1:end], "\n") + "\n"
		last := &list[len(list)-1]
		switch {
		case open == "```calc":
			last.body += "\n```calc\n" + content + "```\n"
		case open == "```wrong":
			for _, line := range lines[i+1 : end] {
				source, says, ok := strings.Cut(line, "→")
				if !ok {
					t.Errorf("%s: %q says nothing", part.Name, line)
				}
				id, _, _ := strings.Cut(strings.TrimSpace(says), ":")
				last.wrong = append(last.wrong, [2]string{strings.TrimSpace(source), id})
			}
		case strings.HasPrefix(content, "---\n"):
			front, body, _ := strings.Cut(content[4:], "\n---\n")
			list = append(list, example{front: "---\n" + front + "\n---\n", body: body})
		default:
			last.body += "\n" + content
		}
		i = end
	}
	return list
}

// Every example of the reference compiles without an error or a warning, and
// every line that it calls wrong draws what it says.
func TestNotationExamples(t *testing.T) {
	_, parts := Notation()
	if len(parts) != len(notationNames) {
		t.Fatalf("%d parts for %d names", len(parts), len(notationNames))
	}
	compiled, wrong := 0, 0
	for _, part := range parts {
		for n, ex := range examplesIn(t, part) {
			root := beside(t)
			compileBody := func(body string) *Sheet {
				root["calc.md"] = &fstest.MapFile{Data: []byte(ex.front + body)}
				return compile(root, "calc.md")
			}
			s := compileBody(ex.body)
			for _, d := range s.Diagnostics {
				if d.Severity != diag.Note {
					t.Errorf("%s, example %d: %s", part.Name, n, d.Text())
				}
			}
			if Status(s) != 0 {
				t.Errorf("%s, example %d: status %d", part.Name, n, Status(s))
			}
			compiled += len(s.Steps)
			for _, w := range ex.wrong {
				wrong++
				var ids []string
				for _, d := range compileBody(ex.body + "\n```calc\n" + w[0] + "\n```\n").Diagnostics {
					if d.Severity != diag.Note {
						ids = append(ids, d.ID)
					}
				}
				if !slices.Equal(ids, []string{w[1]}) {
					t.Errorf("%s: `%s` draws %q, not %s", part.Name, w[0], ids, w[1])
				}
			}
		}
	}
	if compiled < 60 || wrong < 20 {
		t.Errorf("%d statements and %d mistakes: the reference has lost its examples", compiled, wrong)
	}
}

// The reference names every part, key, function and id that there is.
func TestNotationIsComplete(t *testing.T) {
	intro, parts := Notation()
	for _, name := range notationNames {
		if !strings.Contains(intro, name) {
			t.Errorf("the introduction does not name the part %s", name)
		}
	}
	text := map[string]string{}
	for _, p := range parts {
		text[p.Name] = p.Text
		if p.Title == "" || strings.Count(p.Text, "```")%2 != 0 || strings.Count(p.Text, "~~~~")%2 != 0 {
			t.Errorf("the part %s is torn", p.Name)
		}
	}
	for _, key := range calcKeys {
		if !strings.Contains(text["file"], "\n"+key+":") {
			t.Errorf("the key %s is not explained", key)
		}
	}
	for _, id := range []string{
		diag.Syntax, diag.UnknownName, diag.UnknownUnit, diag.Redefined, diag.UsedBefore, diag.DimensionMismatch, diag.NotANumber,
		diag.MissingUnit, diag.WrongUnitSpelling, diag.AmbiguousUnit, diag.OutOfRange, diag.CarriedCycle, diag.MissingFile, diag.RowMismatch,
		diag.UnknownMark, diag.FrontMatter, diag.BareAngle, diag.CarriedFailed, diag.NoConvergence, diag.BoundExceeded,
		diag.UnsupportedCharacter, diag.DroppedLink, diag.Register, diag.NotYet, diag.NoSource, diag.UnusedValue, diag.Internal,
	} {
		if !strings.Contains(text["diagnostics"], fmt.Sprintf("\n| %s |", id)) {
			t.Errorf("the id %s is not explained", id)
		}
	}
}
