package main

import (
	"fmt"
	"image"
	"image/gif"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
	"time"

	"github.com/fsnotify/fsnotify"
)

// lug is a calc with a pull that tests change.
func lug(pull string) string {
	return "---\ncalc: C-1\n---\n\n# Lug\n\n```calc\nP = " + pull + " kN # Pull [schedule]\ntau = P/(2*700 mm^2) # Shear stress\ncheck tau <= 100 MPa\n```\n\n" + prose(pull) + "\n"
}

// prose is a sentence of the calc that is found again on its page.
func prose(pull string) string { return "This is number " + pull + " of the list." }

// TestWatchSaves saves a file in every way that editors and tools do. Each ends
// in the new values, and none but one that takes longer than the quiet period
// between its pieces shows a file that is half written.
func TestWatchSaves(t *testing.T) {
	sh := func(script string, programs ...string) func(*testing.T, string, string) {
		return func(t *testing.T, dir, pull string) {
			for _, p := range programs {
				needs(t, p)
			}
			cmd := exec.Command("sh", "-ec", script)
			cmd.Dir = dir
			cmd.Env = append(os.Environ(), "PULL="+pull)
			if out, err := cmd.CombinedOutput(); err != nil {
				t.Fatalf("%v: %s", err, out)
			}
		}
	}
	nvim := `nvim --clean --headless -c "set backupcopy=%s" -c "%%s/^P = .* kN/P = $PULL kN/" -c "%%s/number .* of/number $PULL of/" -c wq lug.md`
	const pieces = "in pieces after truncating"
	for _, save := range []struct {
		name string
		save func(t *testing.T, dir, pull string)
	}{
		{"in place", func(t *testing.T, dir, pull string) { write(t, filepath.Join(dir, "lug.md"), lug(pull)) }},
		{"slowly after truncating", func(t *testing.T, dir, pull string) {
			f, err := os.Create(filepath.Join(dir, "lug.md"))
			if err != nil {
				t.Fatal(err)
			}
			time.Sleep(10 * quiet)
			if _, err := f.WriteString(lug(pull)); err != nil {
				t.Fatal(err)
			}
			f.Close()
		}},
		{pieces, func(t *testing.T, dir, pull string) {
			f, err := os.Create(filepath.Join(dir, "lug.md"))
			if err != nil {
				t.Fatal(err)
			}
			for piece := range strings.Lines(lug(pull)) {
				time.Sleep(2 * quiet)
				if _, err := f.WriteString(piece); err != nil {
					t.Fatal(err)
				}
			}
			f.Close()
		}},
		{"beside and renamed", sh(`sed "s/^P = .* kN/P = $PULL kN/; s/number .* of/number $PULL of/" lug.md > lug.tmp; mv lug.tmp lug.md`)},
		{"renamed away first", sh(`mv lug.md lug.md~; sleep 0.05; sed "s/^P = .* kN/P = $PULL kN/; s/number .* of/number $PULL of/" lug.md~ > lug.md; rm lug.md~`)},
		{"removed first", sh(`text=$(sed "s/^P = .* kN/P = $PULL kN/; s/number .* of/number $PULL of/" lug.md); rm lug.md; sleep 0.05; echo "$text" > lug.md`)},
		{"sed -i", sh(`sed -i "s/^P = .* kN/P = $PULL kN/; s/number .* of/number $PULL of/" lug.md`)},
		{"cp", sh(`sed "s/^P = .* kN/P = $PULL kN/; s/number .* of/number $PULL of/" lug.md > other; cp other lug.md`)},
		{"nvim, backupcopy yes", sh(fmt.Sprintf(nvim, "yes"), "nvim")},
		{"nvim, backupcopy no", sh(fmt.Sprintf(nvim, "no"), "nvim")},
	} {
		t.Run(save.name, func(t *testing.T) {
			t.Parallel()
			dir := t.TempDir()
			write(t, filepath.Join(dir, "lug.md"), lug("48"))
			p := startWatch(t, dir, "lug.md", "--only", "html")
			for _, pull := range []string{"77", "150"} {
				save.save(t, dir, pull)
				for !strings.Contains(read(t, filepath.Join(dir, "C-1.html")), prose(pull)) {
					p.wait(t, "lug.md: ")
				}
			}
			if said := p.said(); save.name != pieces && (strings.Contains(said, "error") || strings.Contains(said, "gusset:")) {
				t.Errorf("a save was seen half done:\n%s", said)
			}
			p.interrupt(t)
		})
	}
}

// TestWatchFollows changes everything that a calc is made from.
func TestWatchFollows(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	path := func(name string) string { return filepath.Join(dir, name) }
	photo := func(width int) string {
		var b strings.Builder
		if err := gif.Encode(&b, image.NewGray(image.Rect(0, 0, width, 1)), nil); err != nil {
			t.Fatal(err)
		}
		return b.String()
	}
	write(t, path("pkg/loads.md"), "---\ncalc: L-1\n---\n```calc\nG = 20 kN # Dead [survey]\n```\n")
	write(t, path("pkg/shop.md"), "```helper twice # Twice [shop]\nx [force]\ny [force] = 2*x\ngives y\n```\n")
	write(t, path("pkg/bolts.csv"), "mark,x [mm]\nB1,10\nB2,20\n")
	write(t, path("pkg/photo.gif"), photo(1))
	write(t, path("pkg/calcs/lug.md"), "---\ncalc: C-1\nfrom: {loads: ../loads.md}\nhelpers: {shop: ../shop.md}\n---\n\n![photo](../photo.gif)\n\n"+
		"```schedule bolts from ../bolts.csv\n```\n\n```calc\nG = loads.G\nP = shop.twice(G)\nX = sum(bolts.x)\n```\n")
	write(t, path("pkg/register.yaml"), "figures: 4\n")
	p := startWatch(t, dir, "pkg/calcs", "--to", "out", "--only", "html")
	write(t, path("pkg/loads.md"), "---\ncalc: L-1\n---\n```calc\nG = 25 kN # Dead [survey]\n```\n")
	p.wait(t, "G 20 → 25 kN, P 40.00 → 50.00 kN")
	write(t, path("pkg/shop.md"), "```helper twice # Twice [shop]\nx [force]\ny [force] = 3*x\ngives y\n```\n")
	p.wait(t, "lug.md: P 50.00 → 75.00 kN")
	write(t, path("pkg/bolts.csv"), "mark,x [mm]\nB1,10\nB2,25\n")
	p.wait(t, "X 30.00 → 35.00 mm")
	write(t, path("pkg/photo.gif"), photo(2))
	p.wait(t, "lug.md: no value moved")
	write(t, path("pkg/register.yaml"), "figures: 6\n")
	p.wait(t, "X 35.00 → 35.0000 mm")
	if err := os.Remove(path("pkg/photo.gif")); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: has errors; the last good pages stay")
	write(t, path("pkg/photo.gif"), photo(1))
	p.wait(t, "lug.md: no value moved")

	// Calc files that come, are renamed and go.
	write(t, path("pkg/calcs/deep/b.md"), "---\ncalc: C-2\n---\n")
	p.wait(t, "b.md: no checks → out/C-2.html")
	if err := os.Rename(path("pkg/calcs/deep/b.md"), path("pkg/calcs/deep/c.md")); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "c.md: no checks → out/C-2.html")
	if err := os.Remove(path("pkg/calcs/deep/c.md")); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "c.md: it is gone; its pages stay as they are")
	// A file that becomes a calc file. One that stops being one is more likely to
	// be a slip, so it is an error.
	write(t, path("pkg/calcs/notes.md"), "# Notes\n")
	write(t, path("pkg/calcs/notes.md"), "---\ncalc: C-3\n---\n# Notes\n")
	p.wait(t, "notes.md: no checks → out/C-3.html")
	write(t, path("pkg/calcs/notes.md"), "# Notes\n")
	p.wait(t, "notes.md: has errors; the last good pages stay")
	write(t, path("pkg/calcs/new.md"), "---\ncalc: C-4\n---\n") // has the folder walked
	p.wait(t, "new.md: no checks → out/C-4.html")
	write(t, path("pkg/calcs/notes.md"), "---\ncalc: C-3\n---\n# More notes\n")
	p.wait(t, "notes.md: no value moved")
	// A link in its place is not followed.
	if err := os.Remove(path("pkg/calcs/new.md")); err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink("notes.md", path("pkg/calcs/new.md")); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "new.md: no longer a calc file; its pages stay as they are")
	// The register goes, and with it the root in which the other files lie.
	if err := os.Remove(path("pkg/register.yaml")); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: has errors; the last good pages stay")
	write(t, path("pkg/register.yaml"), "figures: 4\n")
	p.wait(t, "X 35.0000 → 35.00 mm")
	p.interrupt(t)
	if said := p.said(); strings.Contains(said, "notes.md: no longer a calc file") {
		t.Errorf("a slip in the front matter is told twice:\n%s", said)
	}
}

// TestWatchBuildsOnlyWhatChanged wants one calc of a folder built, not its
// neighbours.
func TestWatchBuildsOnlyWhatChanged(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	write(t, filepath.Join(dir, "a.md"), lug("48"))
	write(t, filepath.Join(dir, "b.md"), strings.Replace(lug("48"), "C-1", "C-2", 1))
	p := startWatch(t, dir, ".", "--only", "html")
	before, err := os.Stat(filepath.Join(dir, "C-2.html"))
	if err != nil {
		t.Fatal(err)
	}
	write(t, filepath.Join(dir, "a.md"), lug("49"))
	p.wait(t, "a.md: P 48 → 49 kN")
	after, err := os.Stat(filepath.Join(dir, "C-2.html"))
	if err != nil {
		t.Fatal(err)
	}
	if !os.SameFile(before, after) {
		t.Error("a page that nothing changed was written again")
	}
	p.interrupt(t)
	if strings.Contains(p.said(), "b.md: no value moved") {
		t.Errorf("the other calc was built:\n%s", p.said())
	}
}

// TestWatchLinks watches through a folder that is a link.
func TestWatchLinks(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	write(t, filepath.Join(dir, "real", "a.md"), lug("48"))
	if err := os.Symlink("real", filepath.Join(dir, "link")); err != nil {
		t.Fatal(err)
	}
	p := startWatch(t, dir, "link", "--to", "out", "--only", "html")
	write(t, filepath.Join(dir, "real", "a.md"), lug("49"))
	p.wait(t, "link/a.md: P 48 → 49 kN")
	write(t, filepath.Join(dir, "link", "b.md"), strings.Replace(lug("48"), "C-1", "C-2", 1))
	p.wait(t, "link/b.md: 1 check, OK → out/C-2.html")
	write(t, filepath.Join(dir, "link", "b.md"), strings.Replace(lug("47"), "C-1", "C-2", 1))
	p.wait(t, "link/b.md: P 48 → 47 kN")
	p.interrupt(t)
}

// TestWatchErrors wants a save with errors to show them and to leave the pages.
func TestWatchErrors(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	file := filepath.Join(dir, "lug.md")
	write(t, file, lug("48"))
	p := startWatch(t, dir, "lug.md")
	html, pdf := read(t, filepath.Join(dir, "C-1.html")), read(t, filepath.Join(dir, "C-1.pdf"))
	write(t, file, strings.Replace(lug("48"), "P/(2", "Q/(2", 1))
	p.wait(t, "lug.md:9:7: Q is not defined")
	p.wait(t, "ms  lug.md: has errors; the last good pages stay")
	if read(t, filepath.Join(dir, "C-1.html")) != html || read(t, filepath.Join(dir, "C-1.pdf")) != pdf {
		t.Error("the last good pages did not stay")
	}
	// A file that stays empty is an error too, once the longest wait is over.
	write(t, file, "")
	p.wait(t, "the file is empty")
	if err := os.Remove(file); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "gusset: lug.md: there is no such file; the last good pages stay")
	write(t, file, lug("51"))
	p.wait(t, "lug.md: P 48 → 51 kN")
	p.interrupt(t)
}

// TestWatchFolderMoved moves what is watched away and back.
func TestWatchFolderMoved(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	calcs, away := filepath.Join(dir, "job", "calcs"), filepath.Join(dir, "away")
	write(t, filepath.Join(calcs, "sub", "lug.md"), lug("48"))
	p := startWatch(t, dir, "job/calcs", "--to", "out", "--only", "html")
	for _, folder := range []string{calcs, filepath.Dir(calcs)} {
		if err := os.Rename(folder, away); err != nil {
			t.Fatal(err)
		}
		p.wait(t, "gusset: job/calcs: it is gone; its pages stay as they are, and it is printed again once it is back")
		if err := os.Rename(away, folder); err != nil {
			t.Fatal(err)
		}
		p.wait(t, "lug.md: 1 check, OK → out/C-1.html")
	}
	// A folder within what is watched: one line tells of all that was in it.
	sub := filepath.Join(calcs, "sub")
	write(t, filepath.Join(sub, "b.md"), strings.Replace(lug("48"), "C-1", "C-2", 1))
	p.wait(t, "b.md: 1 check, OK → out/C-2.html")
	if err := os.Rename(sub, away); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "gusset: job/calcs/sub: it is gone with 2 calc files; their pages stay as they are")
	if err := os.Rename(away, sub); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: 1 check, OK → out/C-1.html")
	// Removed, and another one put in its place.
	if err := os.RemoveAll(calcs); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "gusset: job/calcs: it is gone")
	write(t, filepath.Join(calcs, "sub", "lug.md"), lug("49"))
	p.wait(t, "lug.md: 1 check, OK → out/C-1.html")
	write(t, filepath.Join(calcs, "sub", "lug.md"), lug("50"))
	p.wait(t, "lug.md: P 49 → 50 kN")
	p.interrupt(t)
}

// TestWatchOutput takes the output folder away and puts things in its way.
func TestWatchOutput(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	out := filepath.Join(dir, "out")
	write(t, filepath.Join(dir, "lug.md"), lug("48"))
	p := startWatch(t, dir, "lug.md", "--to", "out", "--only", "html")
	if err := os.RemoveAll(out); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: its pages were gone and are written again")
	if err := os.RemoveAll(out); err != nil {
		t.Fatal(err)
	}
	write(t, out, "a file")
	write(t, filepath.Join(dir, "lug.md"), lug("49"))
	p.wait(t, "gusset: out: cannot be written: a file stands where a folder should")
	p.wait(t, "lug.md: not written")
	if err := os.Remove(out); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: ")
	if page := read(t, filepath.Join(out, "C-1.html")); !strings.Contains(page, prose("49")) {
		t.Error("the page does not have the value")
	}
	// A folder in the place of a page is seen before the next save.
	page := filepath.Join(out, "C-1.html")
	if err := os.Remove(page); err != nil {
		t.Fatal(err)
	}
	if err := os.Mkdir(page, 0o777); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: not written")
	if err := os.Remove(page); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: its pages were gone and are written again")
	p.interrupt(t)
	if n := strings.Count(p.said(), "a file stands where a folder should"); n != 1 {
		t.Errorf("the problem was told %d times:\n%s", n, p.said())
	}
}

// TestWatchNames lets two calcs come to one name and part again.
func TestWatchNames(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	write(t, filepath.Join(dir, "a.md"), lug("48"))
	p := startWatch(t, dir, ".", "--to", "out", "--only", "html")
	write(t, filepath.Join(dir, "b.md"), lug("49"))
	p.wait(t, "gusset: a.md and b.md would both be written to C-1")
	p.wait(t, "b.md: not written")
	write(t, filepath.Join(dir, "b.md"), strings.Replace(lug("49"), "C-1", "C-2", 1))
	p.wait(t, "b.md: 1 check, OK → out/C-2.html")
	write(t, filepath.Join(dir, "b.md"), strings.Replace(lug("49"), "C-1", "C-3", 1))
	p.wait(t, "b.md: no value moved → out/C-3.html; the pages of the old name stay")
	if page := read(t, filepath.Join(dir, "out", "C-2.html")); !strings.Contains(page, prose("49")) {
		t.Error("the pages of the old name did not stay")
	}
	// One that never had pages leaves none.
	write(t, filepath.Join(dir, "c.md"), lug("50"))
	p.wait(t, "c.md: not written")
	if err := os.Remove(filepath.Join(dir, "c.md")); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "gusset: c.md: it is gone")
	p.interrupt(t)
	if strings.Contains(p.said(), "c.md: it is gone;") {
		t.Errorf("pages that never were are said to stay:\n%s", p.said())
	}
}

// TestWatchEnds wants either signal to end it cleanly, with nothing left beside
// the pages.
func TestWatchEnds(t *testing.T) {
	t.Parallel()
	for _, signal := range []os.Signal{syscall.SIGINT, syscall.SIGTERM} {
		dir := t.TempDir()
		write(t, filepath.Join(dir, "lug.md"), lug("48"))
		p := startWatch(t, dir, "lug.md", "--to", "out")
		p.end(t, signal)
		p.wait(t, "ended")
		if entries, _ := os.ReadDir(filepath.Join(dir, "out")); len(entries) != 2 {
			t.Errorf("there is more than two pages: %v", entries)
		}
	}
}

// TestWatchStarts wants a misuse told at once.
func TestWatchStarts(t *testing.T) {
	dir := t.TempDir()
	for _, test := range []struct {
		args string
		want string
	}{
		{"nowhere.md", "gusset: nowhere.md: there is no such file or folder\n"},
		{".", "gusset: .: no calc files in this folder\n   a calc file is Markdown whose front matter has the key `calc`\n"},
	} {
		if out, status := gussetIn(t, dir, "watch", test.args); out != test.want || status != statusMisuse {
			t.Errorf("watch %s: status %d\n%s", test.args, status, out)
		}
	}
}

// TestFollowerWithoutEvents follows files as on a share that sends no events.
func TestFollowerWithoutEvents(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	file := filepath.Join(dir, "lug.md")
	write(t, file, "old")
	f := followBy(nil)
	defer f.close()
	f.set(interest{files: []string{file}, folders: []string{dir}})
	next := func() []string {
		select {
		case changed := <-f.changes:
			return changed
		case <-time.After(patient):
			t.Fatal("the change is not seen")
			return nil
		}
	}
	write(t, file, "new text")
	if got := next(); len(got) != 1 || got[0] != file {
		t.Errorf("got %q", got)
	}
	write(t, filepath.Join(dir, "other.md"), "x")
	if got := next(); len(got) != 1 || got[0] != dir {
		t.Errorf("got %q", got)
	}
}

// TestFollowerPassesOver wants no change told of what does not matter.
func TestFollowerPassesOver(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	file := filepath.Join(dir, "lug.md")
	write(t, file, "old")
	system, err := fsnotify.NewWatcher()
	if err != nil {
		t.Fatal(err)
	}
	f := followBy(system)
	defer f.close()
	f.set(interest{files: []string{file}})
	for _, name := range []string{"C-1.html", ".gusset-X", "lug.md~", ".lug.md.swp", "other.md", "4913"} {
		write(t, filepath.Join(dir, name), "x")
	}
	write(t, file, "new")
	select {
	case changed := <-f.changes:
		if len(changed) != 1 || changed[0] != file {
			t.Errorf("got %q", changed)
		}
	case <-time.After(patient):
		t.Fatal("the change is not seen")
	}
}
