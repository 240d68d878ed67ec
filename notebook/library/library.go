// Package library holds the helpers that ship with the program, written in the
// notation like anybody's, with the tables of bolts, nails, steels and timber
// that go with them. The files are embedded and read once.
//
//	lib := library.Load()
//	h := lib.Helpers["direct_shear"]
package library

import (
	"embed"
	"fmt"
	"io/fs"
	"path"
	"strings"
	"sync"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

//go:embed *.md *.csv
var files embed.FS

// chapters are the library's files in the order in which they are listed, from
// first principles to particular parts.
var chapters = []string{
	"stress-and-strain.md", "states-of-stress.md", "parts-in-shear.md", "sections.md", "torsion.md",
	"bolt-groups.md", "bolts-and-pins.md", "welds.md", "timber.md", "panels.md", "concrete.md", "soil.md",
}

// Library is what ships with the program. It never changes.
type Library struct {
	check.Library
	Topics      []Topic
	Diagnostics []diag.Diagnostic // of the library's own files; a test holds it empty
}

// Topic is a chapter of helpers.
type Topic struct {
	Title   string
	Intro   string // Markdown
	Entries []Entry
}

// Entry is a helper with what is said of it above its block.
type Entry struct {
	Helper *syntax.Helper
	Title  string // the heading it stands under
	About  string // Markdown, "" where nothing is said
}

// Load returns the library. The first call reads it.
func Load() *Library { return load() }

var load = sync.OnceValue(func() *Library {
	lib := &Library{Library: check.Library{
		Helpers: map[string]*syntax.Helper{}, Natives: map[string]*check.Native{}, Tables: map[string]*diag.Source{},
	}}
	for _, n := range natives {
		lib.Natives[n.Name] = n
	}
	for _, name := range chapters {
		lib.chapter(source(name))
	}
	tables, err := fs.Glob(files, "*.csv")
	if err != nil {
		panic(err) // the pattern is a constant
	}
	for _, name := range tables {
		src := source(name)
		lib.Tables[src.Name] = src
	}
	return lib
})

func source(name string) *diag.Source {
	text, err := files.ReadFile(name)
	if err != nil {
		panic(err) // an embedded file that is not there is a fault of the build
	}
	return diag.NewSource(path.Join("library", name), text)
}

// chapter reads one file: a title, an introduction, and helpers under headings
// of their own with what is said of each. The files are the project's, so a
// fence is a line that starts with three backticks.
func (lib *Library) chapter(src *diag.Source) {
	var topic Topic
	var heading string
	var prose []string
	said := func() string {
		text := strings.TrimSpace(strings.Join(prose, "\n"))
		prose = nil
		return text
	}
	last := src.LineAt(len(src.Text))
	for n := 1; n <= last; n++ {
		line := src.Line(n)
		switch {
		case strings.HasPrefix(line, "# "):
			topic.Title = strings.TrimPrefix(line, "# ")
		case strings.HasPrefix(line, "## "):
			if len(topic.Entries) == 0 && heading == "" {
				topic.Intro = said()
			}
			heading = strings.TrimPrefix(line, "## ")
			prose = nil
		case strings.HasPrefix(line, "```"):
			end := n + 1
			for end < last && src.Line(end) != "```" {
				end++
			}
			if h := lib.helper(src, n, end); h != nil {
				topic.Entries = append(topic.Entries, Entry{Helper: h, Title: heading, About: said()})
			}
			n = end
		default:
			prose = append(prose, line)
		}
	}
	lib.Topics = append(lib.Topics, topic)
}

// helper reads the fence from one line to another.
func (lib *Library) helper(src *diag.Source, from, to int) *syntax.Helper {
	var lines []syntax.Line
	for n := from + 1; n < to; n++ {
		start := src.LineStart(n)
		lines = append(lines, syntax.Line{Start: start, End: start + len(src.Line(n))})
	}
	at := diag.Span{Start: src.LineStart(from), End: src.LineStart(to) + len(src.Line(to))}
	info := diag.Span{Start: at.Start + len("```"), End: at.Start + len(src.Line(from))}
	block, diags := syntax.NewReader(src).Block(info, at, lines)
	lib.Diagnostics = append(lib.Diagnostics, diags...)
	if block == nil || block.Helper == nil || block.Helper.Name == nil {
		return nil
	}
	h := block.Helper
	if first, ok := lib.Helpers[h.Name.ID]; ok {
		lib.Diagnostics = append(lib.Diagnostics, diag.Diagnostic{
			ID: diag.Redefined, Source: src, Span: h.Name.At,
			Message: fmt.Sprintf("%s stands in %s too", h.Name.Text, first.Source.Name),
		})
		return nil
	}
	lib.Helpers[h.Name.ID] = h
	return h
}
