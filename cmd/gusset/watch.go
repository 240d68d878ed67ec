package main

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"os"
	"os/signal"
	"path/filepath"
	"slices"
	"strings"
	"syscall"
	"time"

	"github.com/spf13/cobra"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/notebook/store"
)

func watchCommand(t *terminal) *cobra.Command {
	var p printer
	cmd := &cobra.Command{
		Use:   "watch PATH…",
		Short: "Print calcs, and again at every save",
		Long: `watch prints calc files as print does, and prints again what a save changes: the calc
itself and every calc that carries its values. It follows helper files, tables, images and
the package's register too. Each build is one line: the time it took and what moved in
value. A save with errors shows them and leaves the last good pages. Ctrl-C ends it.`,
		Example: "  gusset watch lug.md\n  gusset watch calcs --to out --only html",
		Args:    onePathOrMore("one calc file or folder or more"),
		RunE: func(_ *cobra.Command, args []string) error {
			if err := p.check(); err != nil {
				return err
			}
			hugePages()
			ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
			defer stop()
			return watch(ctx, t, &p, args)
		},
	}
	p.flags(cmd)
	return cmd
}

// watch prints what the paths stand for at every change, until the context ends.
func watch(ctx context.Context, t *terminal, p *printer, paths []string) error {
	first := find(paths)
	if len(first.files) == 0 {
		for _, err := range first.problems {
			t.problem(err)
		}
		return status(statusMisuse)
	}
	f, err := follow()
	if err != nil {
		t.problem(fmt.Errorf("the system tells of no changes (%w), so the files are looked at once a second", cause(err)))
	}
	defer f.close()
	w := &watcher{t: t, p: p, f: f, paths: paths, store: store.New(), calcs: map[string]*watched{}, said: map[string]string{}}
	w.search(time.Now())
	fmt.Fprintf(t.out, "watching %s; Ctrl-C ends\n", plural(len(w.found.files), "calc file"))
	w.build(nil)
	repair := time.NewTicker(round)
	defer repair.Stop()
	for {
		select {
		case <-ctx.Done():
			fmt.Fprintln(t.out, "ended")
			return nil
		case changed := <-f.changes:
			w.build(changed)
		case <-repair.C:
			w.repair()
		}
	}
}

// watcher builds what changed. It is used by one goroutine.
type watcher struct {
	t     *terminal
	p     *printer
	f     *follower
	paths []string
	found found
	store *store.Store
	calcs map[string]*watched // by file, as it is named
	said  map[string]string   // the last problems told of a subject, so that they are told once
}

// watched is what is known of a calc file.
type watched struct {
	sheet   *notebook.Sheet // as last compiled
	good    *notebook.Sheet // as last written, nil before
	files   []string        // its pages on the disk
	due     bool            // the sheet is good and its pages are not written
	lost    bool            // somebody removed a page
	warning string          // the warnings last shown
}

// follow follows everything that the calcs were made from, the folders that
// were named, and the registers that would move a root.
func (w *watcher) follow(since time.Time) {
	i := interest{files: w.store.Files(), since: since}
	seen := map[string]bool{}
	for _, file := range w.found.files {
		full := absolute(file)
		i.files = append(i.files, full)
		for dir := filepath.Dir(full); !seen[dir]; dir = filepath.Dir(dir) {
			seen[dir] = true
			i.files = append(i.files, filepath.Join(dir, notebook.RegisterName))
		}
	}
	for _, folder := range w.found.folders {
		full := absolute(folder)
		if real, err := filepath.EvalSymlinks(full); err == nil {
			full = real
		}
		i.folders = append(i.folders, full)
	}
	for _, path := range w.paths {
		i.files = append(i.files, absolute(path))
	}
	slices.Sort(i.files)
	i.files = slices.Compact(i.files)
	w.f.set(i)
}

// absolute is a path as the system's events name it, the links of its folder
// resolved.
func absolute(path string) string {
	full, err := filepath.Abs(path)
	if err != nil {
		return path
	}
	if dir, err := filepath.EvalSymlinks(filepath.Dir(full)); err == nil {
		return filepath.Join(dir, filepath.Base(full))
	}
	return full
}

// build compiles and prints what changed; nothing named stands for everything.
func (w *watcher) build(changed []string) {
	start := time.Now()
	w.store.Changed(slices.DeleteFunc(slices.Clone(changed), isFolder))
	if w.moves(changed) {
		w.search(start)
	}
	results := w.store.Compile(w.found.files)
	w.follow(start)
	stems, clashes := w.p.stems(results)
	var fresh []store.Result
	var freshStems []string
	for i, r := range results {
		if w.stale(r, stems[i]) {
			fresh, freshStems = append(fresh, r), append(freshStems, stems[i])
		}
	}
	pages := w.p.writeAll(fresh, freshStems, func() {})
	took := time.Since(start)
	w.tell("names", clashes...)
	w.t.forget()
	var lines []buildPart
	for i, r := range fresh {
		if line := w.finish(r, freshStems[i], pages[i]); line != "" {
			lines = append(lines, buildPart{line, slices.Contains(changed, absolute(r.File))})
		}
	}
	if len(lines) > 0 {
		fmt.Fprintf(w.t.out, "%4d ms  %s\n", took.Milliseconds(), buildLine(lines))
	}
}

// isFolder tells whether a path is a folder that is there. What changed within
// is named by itself.
func isFolder(path string) bool {
	s := stampOf(path)
	return s.info != nil && s.info.IsDir()
}

// mostCalcs is how many calcs a build's line names: the rest is counted.
const mostCalcs = 5

// buildPart is what came of a calc of a build. saved tells that its own file was
// saved, and not one that it rests on.
type buildPart struct {
	line  string
	saved bool
}

// buildLine joins what came of the calcs of a build, those first that were saved,
// and then those in which something moved.
func buildLine(parts []buildPart) string {
	slices.SortStableFunc(parts, func(a, b buildPart) int {
		return cmp.Compare(a.rank(), b.rank())
	})
	var lines []string
	for _, p := range parts {
		lines = append(lines, p.line)
	}
	if more := len(lines) - mostCalcs; more > 1 {
		lines = append(lines[:mostCalcs:mostCalcs], fmt.Sprintf("and %d more calcs", more))
	}
	return strings.Join(lines, "; ")
}

func (p buildPart) rank() int {
	switch {
	case p.saved:
		return 0
	case strings.HasSuffix(p.line, nothingMoved):
		return 2
	}
	return 1
}

// moves tells whether a change may add calc files to the folders or take them
// away.
func (w *watcher) moves(changed []string) bool {
	known := w.store.Files()
	for _, path := range changed {
		info, err := os.Lstat(path)
		if _, found := slices.BinarySearch(known, path); !found || err != nil || !info.Mode().IsRegular() {
			return true
		}
	}
	return false
}

// search walks the folders again until it follows every folder that it finds:
// what comes into a folder before that makes no event.
func (w *watcher) search(since time.Time) {
	for {
		followed := w.found.folders
		w.walk()
		w.follow(since)
		if !slices.ContainsFunc(w.found.folders, func(f string) bool { return !slices.Contains(followed, f) }) {
			return
		}
	}
}

// walk walks the folders. A calc file that was named and is gone stays on the
// list, so that it is seen when it comes back, and so does one that has lost its
// front matter, which is more likely to be a slip.
func (w *watcher) walk() {
	var there, missing []string
	var problems []error
	for _, path := range w.paths {
		switch {
		case stampOf(path).info != nil:
			there = append(there, path)
		case slices.Contains(w.found.files, path):
			missing = append(missing, path)
		default:
			problems = append(problems, fmt.Errorf("%s: it is gone; its pages stay as they are, and it is printed again once it is back", path))
		}
	}
	now := find(there, w.found.files...)
	now.files = append(now.files, missing...)
	var gone []string
	for _, file := range w.found.files {
		if !slices.Contains(now.files, file) {
			gone = append(gone, file)
		}
	}
	w.leave(gone, there)
	w.found = now
	w.tell("paths", append(problems, now.problems...)...)
}

// leave takes leave of calc files that the folders have no more. Those of a
// folder that is gone are told of together, and not at all where the folder was
// named and is told of itself.
func (w *watcher) leave(gone, there []string) {
	type left struct {
		calcs int
		pages bool
	}
	var folders []string
	of := map[string]left{} // by the highest folder that is gone
	for _, file := range gone {
		pages := w.calcs[file] != nil && len(w.calcs[file].files) > 0
		delete(w.calcs, file)
		folder := goneFolder(file)
		switch {
		case stampOf(file).info != nil:
			w.t.problem(fmt.Errorf("%s: no longer a calc file%s", file, stay(pages, 1)))
		case folder == "":
			w.t.problem(fmt.Errorf("%s: it is gone%s", file, stay(pages, 1)))
		case slices.ContainsFunc(there, func(path string) bool { return inside(folder, path) }):
			l, known := of[folder]
			if !known {
				folders = append(folders, folder)
			}
			of[folder] = left{l.calcs + 1, l.pages || pages}
		}
	}
	for _, folder := range folders {
		l := of[folder]
		w.t.problem(fmt.Errorf("%s: it is gone with %s%s", folder, plural(l.calcs, "calc file"), stay(l.pages, l.calcs)))
	}
}

// stay says that the pages of calc files that are gone stay.
func stay(pages bool, calcs int) string {
	switch {
	case !pages:
		return ""
	case calcs == 1:
		return "; its pages stay as they are"
	}
	return "; their pages stay as they are"
}

// goneFolder is the highest folder above a file that is not there, "" where its
// own is.
func goneFolder(file string) (gone string) {
	for dir := filepath.Dir(file); stampOf(dir).info == nil; dir = filepath.Dir(dir) {
		if gone = dir; dir == filepath.Dir(dir) {
			break
		}
	}
	return gone
}

// inside tells whether a path lies in a folder.
func inside(path, folder string) bool {
	rel, err := filepath.Rel(folder, path)
	return err == nil && filepath.IsLocal(rel)
}

// tell tells the problems of a subject, unless they are the ones it had.
// It reports whether it did.
func (w *watcher) tell(subject string, problems ...error) bool {
	text := fmt.Sprint(problems)
	if len(problems) == 0 {
		delete(w.said, subject)
		return false
	}
	if w.said[subject] == text {
		return false
	}
	w.said[subject] = text
	for _, err := range problems {
		w.t.problem(err)
	}
	return true
}

// stale tells whether a calc must be shown or written again.
func (w *watcher) stale(r store.Result, stem string) bool {
	c := w.calcs[r.File]
	if c == nil {
		c = &watched{}
		w.calcs[r.File] = c
	}
	if r.Err != nil {
		w.tell(r.File, errors.New(r.Err.Error()+kept(c)))
		c.sheet, c.due = nil, false
		return false
	}
	if r.Sheet != c.sheet {
		return true
	}
	return c.due && stem != ""
}

// kept says that a calc's pages stay as they were.
func kept(c *watched) string {
	if len(c.files) == 0 {
		return ""
	}
	return "; the last good pages stay"
}

// finish shows what came of a calc and returns its part of the build's line,
// nothing where the pages still cannot be written.
func (w *watcher) finish(r store.Result, stem string, pages written) string {
	c := w.calcs[r.File]
	name := diag.Visible(r.File)
	repeated := c.sheet == r.Sheet
	c.sheet = r.Sheet
	if r.Sheet.Failed() {
		c.due, c.warning = false, ""
		w.tell(r.File)
		w.t.diagnostics(r.Sheet, false)
		return name + ": has errors" + kept(c)
	}
	w.warn(c, r.Sheet, append(slices.Clone(r.Sheet.Diagnostics), pages.warnings...))
	if c.due = stem == "" || pages.err != nil; c.due {
		if pages.err != nil && !w.tell(r.File, pages.err) && repeated {
			return ""
		}
		return name + ": not written" + kept(c)
	}
	w.tell(r.File)
	renamed := len(c.files) > 0 && !slices.Equal(c.files, pages.files)
	c.files = pages.files
	line := name + ": "
	switch {
	case c.good == nil:
		line += verdictLine(r.Sheet) + " → " + names(pages.files)
	case c.lost:
		line += "its pages were gone and are written again"
	default:
		line += movedLine(moved(c.good, r.Sheet))
	}
	if renamed {
		line += " → " + names(pages.files) + "; the pages of the old name stay"
	}
	c.good, c.lost = r.Sheet, false
	return line
}

// warn shows a calc's warnings where they are not those of the last build.
func (w *watcher) warn(c *watched, sheet *notebook.Sheet, list []diag.Diagnostic) {
	var text strings.Builder
	var show []diag.Diagnostic
	for _, d := range list {
		if d.Severity == diag.Warning {
			show = append(show, d)
			text.WriteString(d.Text())
		}
	}
	if c.warning == text.String() {
		return
	}
	c.warning = text.String()
	for _, d := range show {
		w.t.diagnosticOf(sheet, d)
	}
}

// repair writes pages again that could not be written, or that somebody removed.
func (w *watcher) repair() {
	due := false
	for file, c := range w.calcs {
		if c.sheet == nil || c.sheet.Failed() {
			continue
		}
		for _, page := range c.files {
			if s := stampOf(page); !c.due && (s.info == nil || s.info.IsDir()) {
				c.due, c.lost = true, true
			}
		}
		due = due || c.lost || c.due && w.said[file] != ""
	}
	if due {
		w.build(nil)
	}
}
