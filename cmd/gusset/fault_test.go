package main

import (
	"bytes"
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"
)

// versions are two editions of a package of calcs, and the pages of each.
type versions struct {
	sources [2]map[string]string // by file
	pages   map[string][2]string // by page
}

// newVersions prints both editions to learn their pages.
func newVersions(t *testing.T, dir string) versions {
	v := versions{pages: map[string][2]string{}}
	for i := range v.sources {
		v.sources[i] = map[string]string{}
		for n := range 2 {
			text := strings.Replace(lug(fmt.Sprint(40+10*i+n)), "C-1", fmt.Sprintf("C-%d", n), 1)
			v.sources[i][fmt.Sprintf("c%d.md", n)] = text + strings.Repeat("\nA paragraph of prose that fills the page.\n", 40)
		}
		edition := filepath.Join(dir, fmt.Sprint("edition", i))
		for file, text := range v.sources[i] {
			write(t, filepath.Join(edition, file), text)
		}
		if out, status := gussetIn(t, edition, "print", ".", "--to", "out"); status != 0 {
			t.Fatalf("status %d: %s", status, out)
		}
		for n := range 2 {
			for _, ext := range []string{"html", "pdf"} {
				page := fmt.Sprintf("C-%d.%s", n, ext)
				both := v.pages[page]
				both[i] = read(t, filepath.Join(edition, "out", page))
				v.pages[page] = both
			}
		}
	}
	for page, both := range v.pages {
		if both[0] == both[1] {
			t.Fatalf("the editions do not differ in %s", page)
		}
	}
	return v
}

// check wants every page to be of one edition or the other, whole. It returns
// how many are of the second.
func (v versions) check(t *testing.T, out string) (second int) {
	t.Helper()
	for page, both := range v.pages {
		switch got := read(t, filepath.Join(out, page)); got {
		case both[0]:
		case both[1]:
			second++
		default:
			t.Fatalf("%s is neither the old page nor the new one, with %d bytes of %d and %d", page, len(got), len(both[0]), len(both[1]))
		}
	}
	return second
}

func (v versions) write(t *testing.T, dir string, edition int) {
	t.Helper()
	for file, text := range v.sources[edition] {
		write(t, filepath.Join(dir, file), text)
	}
}

// kills is how often a process is killed in each of the two tests.
const kills = 100

// TestPrintKilled kills print at random moments. Every page is the old one or
// the new one, whole.
func TestPrintKilled(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	v := newVersions(t, dir)
	v.write(t, dir, 0)
	calcs := []string{"print", "c0.md", "c1.md", "--to", "out"}
	start := time.Now()
	if out, status := gussetIn(t, dir, calcs...); status != 0 {
		t.Fatalf("status %d: %s", status, out)
	}
	whole := time.Since(start)
	random := rand.New(rand.NewPCG(1, 2))
	mixed := 0
	for i := range kills {
		v.write(t, dir, 1-i%2)
		cmd := exec.Command("gusset", calcs...)
		cmd.Dir = dir
		if err := cmd.Start(); err != nil {
			t.Fatal(err)
		}
		time.Sleep(time.Duration(random.Int64N(int64(whole))))
		_ = cmd.Process.Kill()
		_ = cmd.Wait()
		if n := v.check(t, filepath.Join(dir, "out")); n > 0 && n < len(v.pages) {
			mixed++
		}
	}
	t.Logf("%d of %d kills came between the first page and the last", mixed, kills)
}

// TestWatchKilled kills watch at random moments after a save.
func TestWatchKilled(t *testing.T) {
	t.Parallel()
	dir := t.TempDir()
	v := newVersions(t, dir)
	v.write(t, dir, 0)
	calcs := []string{"c0.md", "c1.md", "--to", "out"}
	p := startWatch(t, dir, calcs...)
	start := time.Now()
	v.write(t, dir, 1)
	p.wait(t, " ms  ")
	whole := time.Since(start)
	p.interrupt(t)
	random := rand.New(rand.NewPCG(3, 4))
	mixed := 0
	for i := range kills {
		p := startWatch(t, dir, calcs...)
		v.write(t, dir, i%2)
		time.Sleep(time.Duration(random.Int64N(int64(whole))))
		_ = p.cmd.Process.Kill()
		<-p.ended
		if n := v.check(t, filepath.Join(dir, "out")); n > 0 && n < len(v.pages) {
			mixed++
		}
	}
	t.Logf("%d of %d kills came between the first page and the last", mixed, kills)
}

// TestReadOnlyFolder takes away the right to write into a folder, which keeps
// everybody out but root.
func TestReadOnlyFolder(t *testing.T) {
	if os.Geteuid() == 0 {
		t.Skip("root may write everywhere; TestReadOnlyDisk does the same by a disk")
	}
	dir := t.TempDir()
	out := filepath.Join(dir, "out")
	write(t, filepath.Join(dir, "lug.md"), lug("48"))
	p := startWatch(t, dir, "lug.md", "--to", "out")
	if err := os.Chmod(out, 0o555); err != nil {
		t.Fatal(err)
	}
	write(t, filepath.Join(dir, "lug.md"), lug("49"))
	p.wait(t, "C-1.html: cannot be written: permission denied; the old one stays")
	if err := os.Chmod(out, 0o777); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: P 48 → 49 kN")
	p.interrupt(t)
}

// TestBadFiles gives print what is no calc file. Each is an error at its place,
// nothing is written, and nothing panics.
func TestBadFiles(t *testing.T) {
	front := "---\ncalc: C-1\n---\n"
	for _, test := range []struct {
		name, text, want string
	}{
		{"Latin-1", front + "Pr\xfcfung\n", "the byte 0xFC is no UTF-8"},
		{"UTF-16", "\xff\xfe-\x00-\x00", "the file is UTF-16"},
		{"NUL", front + "a\x00b\n", "a NUL byte"},
		{"empty", "", "the file is empty"},
		{"large", front + strings.Repeat("x", 17<<20), "it has 18 MB, and a file may have 16 MB at most"},
		{"open fence", front + "```calc\na = 1\n", "closed"},
		{"deep", front + "```calc\na = " + strings.Repeat("(", 5000) + "1" + strings.Repeat(")", 5000) + "\n```\n", "100"},
		{"no YAML", "---\ncalc: C-1\ntitle: Lug: pin\n---\n", "quote"},
		{"large number", front + "```calc\na = 1e400\n```\n", "1e400"},
		{"out of the root", front + "![x](../../etc/passwd)\n", "leaves the root folder"},
		{"long name", front + "```calc\n" + strings.Repeat("a", 10000) + " = 1\n```\n", ""},
		{"emoji", front + "```calc\na = 1 # 🙂 [x]\n```\n", ""},
	} {
		t.Run(test.name, func(t *testing.T) {
			dir := t.TempDir()
			write(t, filepath.Join(dir, "c.md"), test.text)
			out, status := gussetIn(t, dir, "print", "c.md", "--to", "out")
			entries, _ := os.ReadDir(filepath.Join(dir, "out"))
			if strings.Contains(out, "panic") || strings.Contains(out, "internal error") || !strings.Contains(out, test.want) {
				t.Errorf("status %d: %.2000s", status, out)
			}
			if wrote := len(entries) == 2; wrote != (status == 0) || len(entries) != 0 && len(entries) != 2 {
				t.Errorf("status %d and %d pages", status, len(entries))
			}
			if test.want != "" && status != statusErrors {
				t.Errorf("status %d: %.2000s", status, out)
			}
		})
	}
}

// TestTerminal wants colour on a terminal alone, and none where NO_COLOR is set.
func TestTerminal(t *testing.T) {
	var out, err bytes.Buffer
	term := &terminal{out: &out, err: &err, colour: true, alarm: true}
	dir := t.TempDir()
	write(t, filepath.Join(dir, "lug.md"), strings.Replace(lug("480"), "number", "{x}", 1))
	if status := gusset([]string{"run", filepath.Join(dir, "lug.md")}, term); status != statusErrors {
		t.Errorf("status %d", status)
	}
	if !strings.Contains(out.String(), "\x1b[31;1mNG\x1b[0m") {
		t.Errorf("NG is not red: %q", out.String())
	}
	if !strings.Contains(err.String(), "\x1b[31;1m") {
		t.Errorf("the mark under the error is not red: %q", err.String())
	}
	for _, name := range []string{"NO_COLOR", "TERM"} {
		t.Setenv(name, "dumb")
	}
	if styleOf(os.Stdout) {
		t.Error("NO_COLOR is not honoured")
	}
}
