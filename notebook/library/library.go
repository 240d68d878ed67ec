// Package library holds the helpers that ship with the program, written in the
// notation like anybody's, with the tables of bolts, nails, steels and timber
// that go with them. The files are embedded; a helper is read when it is called.
//
//	lib := library.Load()
//	h := lib.Read("direct_shear")
package library

import (
	"embed"
	"io/fs"
	"iter"
	"maps"
	"path"
	"slices"
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

// Library is what ships with the program. It never changes. Its helpers are
// read when they are asked for: a calc calls few of them.
type Library struct {
	check.Library
	// Topics returns the chapters: a title, an introduction, and helpers under
	// headings of their own with what is said of each.
	Topics func() []Topic

	sources []*diag.Source // the chapters
	places  map[string]*place

	mu sync.Mutex // guards what is read of the places
}

// place is where a helper stands, by lines of its chapter, and what was read there.
type place struct {
	src      *diag.Source
	from, to int
	helper   *syntax.Helper // nil before it is asked for
	diags    []diag.Diagnostic
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

// Load returns the library. The first call finds what is in it.
func Load() *Library { return load() }

var load = sync.OnceValue(func() *Library {
	lib := &Library{places: map[string]*place{}}
	lib.Topics = sync.OnceValue(lib.topics)
	lib.Read, lib.Natives, lib.Tables = lib.read, map[string]*check.Native{}, map[string]*diag.Source{}
	for _, n := range natives {
		lib.Natives[n.Name] = n
	}
	for _, name := range chapters {
		src := source(name)
		lib.sources = append(lib.sources, src)
		for p := range fences(src) {
			lib.places[nameIn(src, p)] = p
		}
	}
	lib.Names = slices.Sorted(maps.Keys(lib.places))
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

// fences finds a chapter's blocks. The files are the project's, so a fence is
// a line that starts with three backticks.
func fences(src *diag.Source) iter.Seq[*place] {
	return func(yield func(*place) bool) {
		last := src.LineAt(len(src.Text))
		for n := 1; n <= last; n++ {
			if !strings.HasPrefix(src.Line(n), fence) {
				continue
			}
			p := &place{src: src, from: n, to: n + 1}
			for p.to < last && src.Line(p.to) != fence {
				p.to++
			}
			if n = p.to; !yield(p) {
				return
			}
		}
	}
}

const fence = "```"

// nameIn is the name in a helper's opening line.
func nameIn(src *diag.Source, p *place) string {
	words := strings.Fields(src.Line(p.from))
	return words[1]
}

// read returns the helper of one of the library's names.
func (lib *Library) read(name string) *syntax.Helper {
	lib.mu.Lock()
	defer lib.mu.Unlock()
	p := lib.places[name]
	if p.helper == nil {
		p.read()
	}
	return p.helper
}

func (p *place) read() {
	var lines []syntax.Line
	for n := p.from + 1; n < p.to; n++ {
		start := p.src.LineStart(n)
		lines = append(lines, syntax.Line{Start: start, End: start + len(p.src.Line(n))})
	}
	at := diag.Span{Start: p.src.LineStart(p.from), End: p.src.LineStart(p.to) + len(fence)}
	info := diag.Span{Start: at.Start + len(fence), End: at.Start + len(p.src.Line(p.from))}
	block, diags := syntax.NewReader(p.src, at.End-at.Start).Block(info, at, lines)
	p.helper, p.diags = block.Helper, diags
}

func (lib *Library) topics() []Topic {
	var topics []Topic
	for _, src := range lib.sources {
		topics = append(topics, lib.topic(src))
	}
	return topics
}

func (lib *Library) topic(src *diag.Source) Topic {
	var topic Topic
	var heading string
	var prose []string
	said := func() string {
		text := strings.TrimSpace(strings.Join(prose, "\n"))
		prose = nil
		return text
	}
	last := src.LineAt(len(src.Text))
	n := 1
	text := func(end int) {
		for ; n < end; n++ {
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
			default:
				prose = append(prose, line)
			}
		}
	}
	for p := range fences(src) {
		text(p.from)
		topic.Entries = append(topic.Entries, Entry{Helper: lib.read(nameIn(src, p)), Title: heading, About: said()})
		n = p.to + 1
	}
	text(last + 1)
	return topic
}
