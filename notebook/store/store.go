// Package store keeps the calc files that somebody works on, and what was made
// of them: it compiles many at a time, each carried file once, and again only
// what changed and what depends on it.
//
//	s := store.New()
//	results := s.Compile([]string{"calcs/lug.md", "calcs/splice.md"})
//	s.Changed([]string{"calcs/loads.md"})
//	results = s.Compile([]string{"calcs/lug.md", "calcs/splice.md"})
//
// The store knows of a change only what Changed tells it. It keeps what the last
// Compile needed and nothing else, so that its memory is bounded by what is
// worked on.
package store

import (
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"sync"

	"golang.org/x/sync/errgroup"

	"gusset/notebook"
)

// Store keeps drafts and sheets by root. Its methods may be called from several
// goroutines; one compiles at a time.
type Store struct {
	mu    sync.Mutex
	roots map[string]*root // by folder
}

// root is a root folder with what was made of its files, by path within.
type root struct {
	dir    string
	place  notebook.Place // of the first file named
	drafts map[string]*notebook.Draft
	sheets map[string]*made
}

// made is a sheet with what it was made from: it holds as long as these do.
type made struct {
	sheet   *notebook.Sheet
	draft   *notebook.Draft
	carried []*notebook.Sheet // nil for one that is part of a cycle
}

// Result is what became of a file that was to be compiled. Err tells why it
// could not be read; its Sheet is then nil.
type Result struct {
	File  string // as it was named
	Sheet *notebook.Sheet
	Err   error
}

// New returns an empty store.
func New() *Store { return &Store{roots: map[string]*root{}} }

// Compile compiles files and those that they carry values from, in parallel.
// The results stand in the order of the files.
func (s *Store) Compile(files []string) []Result {
	s.mu.Lock()
	defer s.mu.Unlock()
	results := make([]Result, len(files))
	roots, paths := make([]*root, len(files)), make([]string, len(files))
	b := &batch{tops: map[*root][]string{}}
	for i, file := range files {
		place, err := notebook.Locate(file)
		results[i] = Result{File: file, Err: err}
		if err == nil {
			roots[i], paths[i] = s.root(place), place.Path
			b.add(roots[i], paths[i])
		}
	}
	b.open()
	b.read()
	b.close()
	b.compute()
	s.prune(b)
	for i, r := range roots {
		if r == nil {
			continue
		}
		if results[i].Err = b.failed[r]; results[i].Err != nil {
			continue
		}
		sheet := r.sheets[paths[i]].sheet
		if results[i].Err = sheet.Unreadable(); results[i].Err == nil {
			results[i].Sheet = sheet
		}
	}
	return results
}

func (s *Store) root(place notebook.Place) *root {
	r := s.roots[place.Root]
	if r == nil {
		r = &root{dir: place.Root, place: place, drafts: map[string]*notebook.Draft{}, sheets: map[string]*made{}}
		s.roots[place.Root] = r
	}
	return r
}

// Changed forgets what was read from the files, or from anything in a folder of
// that name. A register that comes or goes moves roots, so that everything
// is forgotten.
func (s *Store) Changed(files []string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	for _, file := range files {
		if filepath.Base(file) == notebook.RegisterName {
			s.roots = map[string]*root{}
			return
		}
		for _, r := range s.roots {
			for _, within := range r.within(file) {
				r.forget(within)
			}
		}
	}
}

// within lists a file's paths within the root, which may be gone: the one that it
// is named by, and the one with the links of its folder resolved. A calc that
// names a file through a link within the root knows it by the first. The root
// itself is ".".
func (r *root) within(file string) []string {
	full, err := filepath.Abs(file)
	if err != nil {
		full = file
	}
	spelled := []string{full}
	if dir, err := filepath.EvalSymlinks(filepath.Dir(full)); err == nil {
		spelled = append(spelled, filepath.Join(dir, filepath.Base(full)))
	}
	var paths []string
	for _, full := range slices.Compact(spelled) {
		rel, err := filepath.Rel(r.dir, full)
		if err == nil && filepath.IsLocal(rel) {
			paths = append(paths, filepath.ToSlash(rel))
		}
	}
	return paths
}

// forget drops the drafts that were read from a file or from a folder. Their
// sheets, and those that rest on them, no longer match and are made anew.
func (r *root) forget(within string) {
	for path, d := range r.drafts {
		if within == "." || slices.ContainsFunc(d.Files, func(f string) bool {
			return f == within || strings.HasPrefix(f, within+"/")
		}) {
			delete(r.drafts, path)
		}
	}
}

// Files lists every file that the kept results were made from, or that was
// looked for in vain: what to watch. They are absolute and sorted.
func (s *Store) Files() []string {
	s.mu.Lock()
	defer s.mu.Unlock()
	var files []string
	for _, r := range s.roots {
		for _, m := range r.sheets {
			for _, f := range m.sheet.Files {
				files = append(files, filepath.Join(r.dir, filepath.FromSlash(f)))
			}
		}
	}
	slices.Sort(files)
	return slices.Compact(files)
}

// Depends lists the calc files whose results rest on a file, itself included
// where it is one: absolute and sorted.
func (s *Store) Depends(file string) []string {
	s.mu.Lock()
	defer s.mu.Unlock()
	var out []string
	for _, r := range s.roots {
		for _, within := range r.within(file) {
			for path, m := range r.sheets {
				if slices.Contains(m.sheet.Files, within) {
					out = append(out, filepath.Join(r.dir, filepath.FromSlash(path)))
				}
			}
		}
	}
	slices.Sort(out)
	return slices.Compact(out)
}

// batch is one call of Compile.
type batch struct {
	mu     sync.Mutex
	order  []*root
	tops   map[*root][]string
	opened map[*root]*os.Root
	failed map[*root]error
}

func (b *batch) add(r *root, path string) {
	if _, ok := b.tops[r]; !ok {
		b.order = append(b.order, r)
	}
	b.tops[r] = append(b.tops[r], path)
}

func (b *batch) open() {
	b.opened, b.failed = map[*root]*os.Root{}, map[*root]error{}
	for _, r := range b.order {
		if opened, err := r.place.Open(); err != nil {
			b.failed[r] = err
		} else {
			b.opened[r] = opened
		}
	}
}

func (b *batch) close() {
	for _, opened := range b.opened {
		opened.Close()
	}
}

// read reads the drafts that are not at hand, in waves: those that were named,
// those that these carry from, and so on.
func (b *batch) read() {
	type task struct {
		root *root
		path string
	}
	var wave []task
	for _, r := range b.order {
		for _, path := range b.tops[r] {
			wave = append(wave, task{r, path})
		}
	}
	reached := map[task]bool{}
	for len(wave) > 0 {
		work := workers()
		for _, t := range wave {
			opened := b.opened[t.root]
			if reached[t] || opened == nil {
				continue
			}
			reached[t] = true
			if b.draft(t.root, t.path) != nil {
				continue
			}
			work.Go(func() error {
				c := &notebook.Context{FS: opened.FS(), Shown: t.root.place.Shown}
				d := notebook.Read(c, t.path)
				b.mu.Lock()
				t.root.drafts[t.path] = d
				b.mu.Unlock()
				return nil
			})
		}
		wait(work)
		var next []task
		for _, t := range wave {
			if d := b.draft(t.root, t.path); d != nil {
				for _, path := range d.Carries() {
					if n := (task{t.root, path}); !reached[n] {
						next = append(next, n)
					}
				}
			}
		}
		wave = next
	}
}

func (b *batch) draft(r *root, path string) *notebook.Draft {
	b.mu.Lock()
	defer b.mu.Unlock()
	return r.drafts[path]
}

// compute makes the sheets, those first that carry nothing, then those that
// carry from these, and so on.
func (b *batch) compute() {
	var levels [][]func()
	for _, r := range b.order {
		if b.opened[r] == nil {
			continue
		}
		find := func(path string) *notebook.Draft { return r.drafts[path] }
		var tops []*notebook.Draft
		for _, path := range b.tops[r] {
			tops = append(tops, find(path))
		}
		level := map[string]int{}
		for _, d := range notebook.Order(tops, find) {
			n := 0
			for _, path := range d.Carries() {
				if below, ok := level[path]; ok {
					n = max(n, below+1)
				}
			}
			level[d.Path] = n
			for len(levels) <= n {
				levels = append(levels, nil)
			}
			levels[n] = append(levels[n], func() { b.make(r, d, find) })
		}
	}
	for _, level := range levels {
		work := workers()
		for _, f := range level {
			work.Go(func() error { f(); return nil })
		}
		wait(work)
	}
}

// make makes the sheet of a draft, unless the one at hand was made from the
// same draft and the same sheets.
func (b *batch) make(r *root, d *notebook.Draft, find func(string) *notebook.Draft) {
	b.mu.Lock()
	old := r.sheets[d.Path]
	b.mu.Unlock()
	m := &made{draft: d}
	for _, path := range d.Carries() {
		var sheet *notebook.Sheet
		if notebook.Cycle(d, path, find) == nil {
			sheet = b.sheet(r, path)
		}
		m.carried = append(m.carried, sheet)
	}
	if old != nil && old.draft == d && slices.Equal(old.carried, m.carried) && !slices.Contains(m.carried, nil) {
		return
	}
	m.sheet = d.Compute(find, func(path string) *notebook.Sheet { return b.sheet(r, path) })
	b.mu.Lock()
	r.sheets[d.Path] = m
	b.mu.Unlock()
}

func (b *batch) sheet(r *root, path string) *notebook.Sheet {
	b.mu.Lock()
	defer b.mu.Unlock()
	if m := r.sheets[path]; m != nil {
		return m.sheet
	}
	return nil
}

// prune drops what the batch did not need.
func (s *Store) prune(b *batch) {
	for dir, r := range s.roots {
		tops, ok := b.tops[r]
		if !ok || b.opened[r] == nil {
			delete(s.roots, dir)
			continue
		}
		find := func(path string) *notebook.Draft { return r.drafts[path] }
		needed := map[string]bool{}
		var drafts []*notebook.Draft
		for _, path := range tops {
			drafts = append(drafts, find(path))
		}
		for _, d := range notebook.Order(drafts, find) {
			needed[d.Path] = true
		}
		for path := range r.drafts {
			if !needed[path] {
				delete(r.drafts, path)
			}
		}
		for path := range r.sheets {
			if !needed[path] {
				delete(r.sheets, path)
			}
		}
	}
}

func workers() *errgroup.Group {
	work := &errgroup.Group{}
	work.SetLimit(runtime.GOMAXPROCS(0))
	return work
}

// wait waits for work that has no errors to return: they are in the sheets.
func wait(work *errgroup.Group) { _ = work.Wait() }
