package main

import (
	"io/fs"
	"maps"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"time"

	"github.com/fsnotify/fsnotify"

	"gusset/notebook"
)

// One save makes up to five events within a millisecond, and editors that write
// a copy first take a few. So a change counts once nothing more has come for the
// quiet period; a change that goes on and on is looked at after the longest wait.
const (
	quiet       = 15 * time.Millisecond
	longestWait = 300 * time.Millisecond
	// round is how often the followed files are looked at, for network shares,
	// which send no events.
	round = time.Second
)

// interest is what is followed, all paths absolute.
type interest struct {
	files   []string // files that matter, whether or not they exist
	folders []string // folders in which any Markdown file or folder matters
	// since is when the files that were not followed before were begun to be
	// read: what changed later is told.
	since time.Time
}

// follower tells of changes to files, gathered until they have come to rest. It
// watches folders, since a watch on a file dies when an editor renames over it.
type follower struct {
	changes chan []string // absolute paths, sorted
	want    chan interest
	done    chan struct{}

	system  *fsnotify.Watcher // nil where the system has none left
	watched map[string]stamp  // the folders it watches, as they were when it began
	files   map[string]stamp  // what is looked at each round: files and folders
	folders map[string]bool   // in which anything matters

	pending map[string]time.Time // changed and not told yet, and when they first did
}

// stamp is what a file looks like from outside.
type stamp struct {
	info fs.FileInfo // nil where there is none
}

func stampOf(path string) stamp {
	info, err := os.Stat(path)
	if err != nil {
		return stamp{}
	}
	return stamp{info}
}

func (s stamp) same(o stamp) bool {
	if s.info == nil || o.info == nil {
		return s.info == o.info
	}
	return s.info.Size() == o.info.Size() && s.info.ModTime().Equal(o.info.ModTime()) &&
		s.info.Mode() == o.info.Mode() && os.SameFile(s.info, o.info)
}

// empty tells that there is no file, or nothing in it.
func (s stamp) empty() bool { return s.info == nil || s.info.Mode().IsRegular() && s.info.Size() == 0 }

// follow starts a follower. The error tells why it gets no events: it then sees
// changes at each round alone.
func follow() (*follower, error) {
	system, err := fsnotify.NewWatcher()
	if err != nil {
		return followBy(nil), err
	}
	return followBy(system), nil
}

func followBy(system *fsnotify.Watcher) *follower {
	f := &follower{
		changes: make(chan []string), want: make(chan interest), done: make(chan struct{}), system: system,
		watched: map[string]stamp{}, files: map[string]stamp{}, folders: map[string]bool{}, pending: map[string]time.Time{},
	}
	go f.loop()
	return f
}

// set says what to follow from now on.
func (f *follower) set(i interest) { f.want <- i }

// close ends the follower.
func (f *follower) close() {
	close(f.done)
	if f.system != nil {
		f.system.Close()
	}
}

func (f *follower) loop() {
	rest := time.NewTimer(quiet)
	rest.Stop()
	tick := time.NewTicker(round)
	defer tick.Stop()
	var events chan fsnotify.Event
	var failures chan error
	if f.system != nil {
		events, failures = f.system.Events, f.system.Errors
	}
	var out chan []string // f.changes while something waits to be told
	for {
		select {
		case <-f.done:
			return
		case i := <-f.want:
			if f.take(i) {
				out = nil
				rest.Reset(f.patience())
			}
		case e, open := <-events:
			if !open {
				events = nil
			} else if f.note(e) {
				out = nil
				rest.Reset(f.patience())
			}
		case <-failures: // events were lost: the round finds what they told of
			f.look()
			rest.Reset(f.patience())
		case <-tick.C:
			f.watch()
			if f.look() {
				out = nil
				rest.Reset(f.patience())
			}
		case <-rest.C:
			switch {
			case len(f.pending) == 0:
			case f.settled():
				out = f.changes
			default:
				rest.Reset(quiet)
			}
		case out <- slices.Sorted(maps.Keys(f.pending)):
			out = nil
			f.pending = map[string]time.Time{}
		}
	}
}

// patience is how long to wait for more: the quiet period, but not beyond the
// longest wait.
func (f *follower) patience() time.Duration {
	wait := quiet
	for _, since := range f.pending {
		wait = min(wait, time.Until(since.Add(longestWait)))
	}
	return max(wait, 0)
}

// settled tells whether what changed can be read. A file that is gone or empty
// and was not before is most likely in the middle of being saved: by truncation,
// or by an editor that moves the old file away first.
func (f *follower) settled() bool {
	fresh := map[string]stamp{}
	for path, since := range f.pending {
		old, ok := f.files[path]
		if !ok {
			continue
		}
		now := stampOf(path)
		if now.empty() && !old.empty() && time.Since(since) < longestWait {
			return false
		}
		fresh[path] = now
	}
	maps.Copy(f.files, fresh)
	return true
}

func (f *follower) add(path string) {
	if _, already := f.pending[path]; !already {
		f.pending[path] = time.Now()
	}
}

// note takes an event and tells whether it matters.
func (f *follower) note(e fsnotify.Event) bool {
	if e.Op == fsnotify.Chmod || !f.matters(e.Name) {
		return false
	}
	f.add(e.Name)
	if _, file := f.files[e.Name]; !file || isFolder(e.Name) {
		f.look() // what lies in a folder moves without events of its own
	}
	return true
}

func (f *follower) matters(path string) bool {
	if _, ok := f.files[path]; ok {
		return true
	}
	if f.folders[filepath.Dir(path)] {
		if isMarkdown(path) {
			return true
		}
		if info, err := os.Stat(path); err == nil && info.IsDir() {
			return true
		}
	}
	for file := range f.files { // a folder above what is followed
		if strings.HasPrefix(file, path+string(filepath.Separator)) {
			return true
		}
	}
	return false
}

// look compares the followed files with what they were and tells whether any
// changed.
func (f *follower) look() bool {
	changed := false
	for path, old := range f.files {
		if _, already := f.pending[path]; !already && !stampOf(path).same(old) {
			f.add(path)
			changed = true
		}
	}
	return changed
}

// take takes on what is to be followed. What was followed before keeps its
// stamp, so that a change in between is seen at the next round. It reports
// whether a file changed that was not followed yet.
func (f *follower) take(i interest) bool {
	changed := false
	old := f.files
	f.files, f.folders = map[string]stamp{}, map[string]bool{}
	for _, path := range slices.Concat(i.files, i.folders) {
		s, known := old[path]
		if !known {
			s = stampOf(path)
			if s.info != nil && s.info.Mode().IsRegular() && !s.info.ModTime().Before(i.since) {
				f.add(path)
				changed = true
			}
		}
		f.files[path] = s
	}
	for _, folder := range i.folders {
		f.folders[folder] = true
	}
	f.watch()
	return changed
}

// watch asks the system for events of every folder that holds what is followed
// and exists, and drops those that hold nothing any more. A folder that was moved
// or removed, itself or with one above it, and is there again is watched anew.
func (f *follower) watch() {
	if f.system == nil {
		return
	}
	want := map[string]bool{}
	for path := range f.files {
		// A register that is looked for in vain up to the top of the disk is left
		// to the round.
		if filepath.Base(path) != notebook.RegisterName || f.files[path].info != nil {
			want[filepath.Dir(path)] = true
		}
	}
	for folder := range f.folders {
		want[folder] = true
	}
	for _, folder := range f.system.WatchList() {
		if want[folder] && os.SameFile(stampOf(folder).info, f.watched[folder].info) {
			delete(want, folder)
			continue
		}
		_ = f.system.Remove(folder)
	}
	for folder := range want {
		if s := stampOf(folder); s.info != nil && f.system.Add(folder) == nil {
			f.watched[folder] = s // one that cannot be watched is looked at each round
		}
	}
}
