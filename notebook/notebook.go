// Package notebook compiles a calc file from bytes to results. It is the one
// door the rest of the program uses: Open for a file on disk, Compile for a
// file system in memory.
//
//	sheet, err := notebook.Open("lug.md")
//	if err != nil { … }        // the file could not be read
//	if sheet.Failed() { … }    // sheet.Diagnostics says why
//	for _, step := range sheet.Steps { … }
//
// A calc file is read in two strides. Read does everything that needs no other
// calc file: front matter, Markdown, the fences' trees, the files it names. The
// Draft it leaves is computed once the calc files it carries values from are
// sheets. Compile does both for a file and what stands behind it; a store that
// keeps many files may do either stride for many at a time.
package notebook

import (
	"fmt"
	"io/fs"
	"os"
	"path"
	"path/filepath"
	"strings"

	"gusset/notebook/diag"
)

// Context is where calc files and the files they name are read from. Its zero
// value but for FS works.
type Context struct {
	FS fs.FS // the root: no file outside it can be named
	// Shown turns a path within the root into the name that diagnostics give
	// it; nil keeps the path.
	Shown func(path string) string
	// Panics lets a panic through, as tests want it. Otherwise it becomes an
	// internal error that names the file.
	Panics bool
}

func (c *Context) shown(path string) string {
	if c.Shown == nil {
		return path
	}
	return c.Shown(path)
}

// Open compiles a calc file on disk with the files it names. The root is the
// folder of the nearest register.yaml above it, else its own folder; nothing
// outside is read, links included. The error tells why the file itself cannot
// be read; all else is in the sheet's diagnostics.
func Open(file string) (*Sheet, error) {
	place, err := Locate(file)
	if err != nil {
		return nil, err
	}
	root, err := place.Open()
	if err != nil {
		return nil, err
	}
	defer root.Close()
	sheet := Compile(&Context{FS: root.FS(), Shown: place.Shown}, place.Path)
	return sheet, sheet.Unreadable()
}

// Place is where a file on disk lies: the root it belongs to and its path
// within.
type Place struct {
	Root string // absolute, links resolved
	Path string // within the root, with slashes
	dir  string // the file's folder as the user spelled it
}

// Open opens the root, beyond which nothing is read.
func (p Place) Open() (*os.Root, error) {
	root, err := os.OpenRoot(p.Root)
	if err != nil {
		return nil, plainError(p.Shown("."), err)
	}
	return root, nil
}

// Shown names a file of the root as the user would who named the place's own.
func (p Place) Shown(file string) string {
	rel, err := filepath.Rel(filepath.FromSlash(path.Dir(p.Path)), filepath.FromSlash(file))
	if err != nil {
		return file
	}
	return filepath.ToSlash(filepath.Join(p.dir, rel))
}

// Locate finds the root of a file. The file's own links are resolved first, so
// that the root is where the file really lies.
func Locate(file string) (Place, error) {
	if info, err := os.Stat(file); err != nil {
		return Place{}, plainError(file, err)
	} else if info.IsDir() {
		return Place{}, fmt.Errorf("%s: it is a folder", file)
	}
	real, err := filepath.EvalSymlinks(file)
	if err == nil {
		real, err = filepath.Abs(real)
	}
	if err != nil {
		return Place{}, plainError(file, err)
	}
	own, name := filepath.Dir(real), filepath.Base(real)
	place := Place{Root: own, Path: name, dir: filepath.Dir(file)}
	if name != filepath.Base(file) {
		place.dir = own
	}
	for dir, inside := own, name; ; {
		if info, err := os.Stat(filepath.Join(dir, RegisterName)); err == nil && info.Mode().IsRegular() {
			place.Root, place.Path = dir, filepath.ToSlash(inside)
			return place, nil
		}
		parent := filepath.Dir(dir)
		if parent == dir {
			return place, nil
		}
		inside = filepath.Join(filepath.Base(dir), inside)
		dir = parent
	}
}

// plainError says what an operating system's error means without its calls.
func plainError(file string, err error) error {
	return fmt.Errorf("%s: %s", file, reason(err))
}

// RegisterName is the file whose folder is a package's root.
const RegisterName = "register.yaml"

// Compile compiles one file of the root, and before it the files that it
// carries values from. It depends on nothing but the files' bytes.
func Compile(c *Context, file string) *Sheet {
	drafts := map[string]*Draft{}
	queue := []string{path.Clean(file)}
	for len(queue) > 0 {
		next := queue[0]
		queue = queue[1:]
		if drafts[next] == nil {
			drafts[next] = Read(c, next)
			queue = append(queue, drafts[next].Carries()...)
		}
	}
	find := func(path string) *Draft { return drafts[path] }
	sheets := map[string]*Sheet{}
	for _, d := range Order([]*Draft{drafts[path.Clean(file)]}, find) {
		sheets[d.Path] = d.Compute(find, func(path string) *Sheet { return sheets[path] })
	}
	return sheets[path.Clean(file)]
}

// Order lists drafts and all they carry from, directly or not, each once and
// behind the ones it carries from. What carries from itself stands somewhere
// in its cycle; Compute reports it.
func Order(tops []*Draft, find func(path string) *Draft) []*Draft {
	type visit struct {
		draft *Draft
		links []string
	}
	var order []*Draft
	var stack []visit
	seen := map[string]bool{}
	enter := func(d *Draft) {
		if !seen[d.Path] {
			seen[d.Path] = true
			stack = append(stack, visit{d, d.Carries()})
		}
	}
	for _, top := range tops {
		enter(top)
		for len(stack) > 0 {
			v := &stack[len(stack)-1]
			if len(v.links) > 0 {
				next := v.links[0]
				v.links = v.links[1:]
				enter(find(next))
				continue
			}
			order = append(order, v.draft)
			stack = stack[:len(stack)-1]
		}
	}
	return order
}

// Cycle returns the shortest chain of carried files that leads from a draft
// through one of the files it carries from back to itself, both ends included;
// nil where there is none.
func Cycle(d *Draft, through string, find func(path string) *Draft) []string {
	from := map[string]string{through: d.Path}
	queue := []string{through}
	for len(queue) > 0 {
		at := queue[0]
		queue = queue[1:]
		if at == d.Path {
			chain := []string{at}
			for p := from[at]; p != d.Path; p = from[p] {
				chain = append([]string{p}, chain...)
			}
			return append([]string{d.Path}, chain...)
		}
		for _, next := range find(at).Carries() {
			if _, ok := from[next]; !ok {
				from[next] = at
				queue = append(queue, next)
			}
		}
	}
	return nil
}

// IsCalc tells whether a file's text has front matter with the key `calc`.
// Front matter that is no YAML counts where a line of it begins with the key,
// so that its fault is reported and the file not passed over.
func IsCalc(text []byte) bool {
	src := diag.NewSource("", text)
	front, _, ok := cutFront(src.Text)
	if !ok {
		return false
	}
	for line := range strings.Lines(string(src.Text[front.Start:front.End])) {
		if rest, found := strings.CutPrefix(line, "calc"); found && strings.HasPrefix(strings.TrimLeft(rest, " \t"), ":") {
			return true
		}
	}
	return false
}
