package main

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
	"time"

	"pgregory.net/rapid"
)

func TestFileName(t *testing.T) {
	for _, test := range []struct{ number, want string }{
		{"C-104", "C-104"},
		{"C/104 A.2", "C-104-A.2"},
		{"  C  104  ", "C-104"},
		{"..", ""},
		{"../../etc/passwd", "etc-passwd"},
		{".hidden", "hidden"},
		{"CON:1", "CON-1"},
		{"С-7", "С-7"}, // Cyrillic letters are letters
		{"Prüfung 3", "Prüfung-3"},
		{"a\x00b\nc", "a-b-c"},
		{"C_104", "C_104"},
		{"//", ""},
		{"", ""},
	} {
		if got := fileName(test.number); got != test.want {
			t.Errorf("fileName(%q) = %q, want %q", test.number, got, test.want)
		}
	}
}

// TestFileNameIsSafe holds every name to what the notation promises of it.
func TestFileNameIsSafe(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name := fileName(rapid.String().Draw(t, "number"))
		if strings.ContainsAny(name, "/\\:*?\"<>| \x00\n") || strings.HasPrefix(name, ".") || name != filepath.Base("x/" + name)[:len(name)] && name != "" {
			t.Fatalf("%q is no safe name", name)
		}
		if again := fileName(name); again != name {
			t.Fatalf("%q is cleaned again, to %q", name, again)
		}
	})
}

func TestWriteWhole(t *testing.T) {
	dir := t.TempDir()
	file := filepath.Join(dir, "C-1.html")
	for _, text := range []string{"old", "new and longer", ""} {
		if err := writeWhole(file, []byte(text)); err != nil {
			t.Fatal(err)
		}
		if got, err := os.ReadFile(file); err != nil || string(got) != text {
			t.Fatalf("got %q, %v; want %q", got, err, text)
		}
	}
	if entries, _ := os.ReadDir(dir); len(entries) != 1 {
		t.Errorf("something is left beside the file: %v", entries)
	}
	// A folder of the file's name is an error that leaves nothing behind.
	folder := filepath.Join(dir, "C-2.html")
	if err := os.MkdirAll(filepath.Join(folder, "x"), 0o777); err != nil {
		t.Fatal(err)
	}
	if err := writeWhole(folder, []byte("x")); err == nil {
		t.Error("a folder was written over")
	}
	if entries, _ := os.ReadDir(dir); len(entries) != 2 {
		t.Errorf("something is left beside the file: %v", entries)
	}
}

func TestSweep(t *testing.T) {
	dir := t.TempDir()
	old, fresh, other := filepath.Join(dir, temporary+"OLD"), filepath.Join(dir, temporary+"FRESH"), filepath.Join(dir, "C-1.html")
	for _, f := range []string{old, fresh, other} {
		if err := os.WriteFile(f, []byte("x"), 0o666); err != nil {
			t.Fatal(err)
		}
	}
	long := time.Now().Add(-2 * leftFor)
	for _, f := range []string{old, other} {
		if err := os.Chtimes(f, long, long); err != nil {
			t.Fatal(err)
		}
	}
	sweep(dir)
	for f, want := range map[string]bool{old: false, fresh: true, other: true} {
		if _, err := os.Stat(f); (err == nil) != want {
			t.Errorf("%s is there: %v, want %v", filepath.Base(f), err == nil, want)
		}
	}
}

func TestUnwritable(t *testing.T) {
	there := filepath.Join(t.TempDir(), "C-1.pdf")
	if err := os.WriteFile(there, nil, 0o666); err != nil {
		t.Fatal(err)
	}
	wrap := func(err error) error { return &fs.PathError{Op: "open", Path: "x", Err: err} }
	for _, test := range []struct {
		path string
		err  error
		want string
	}{
		{"out/C-1.pdf", wrap(syscall.ENOSPC), "out/C-1.pdf: cannot be written: the disk is full"},
		{there, wrap(syscall.ENOSPC), there + ": cannot be written: the disk is full; the old one stays"},
		{"out/C-1.pdf", wrap(syscall.EROFS), "out/C-1.pdf: cannot be written: the disk is read-only"},
		{"out/C-1.pdf", wrap(syscall.EACCES), "out/C-1.pdf: cannot be written: permission denied"},
		{"out/C-1.pdf", wrap(syscall.EDQUOT), "out/C-1.pdf: cannot be written: the disk quota is used up"},
		{"out/C-1.pdf", wrap(syscall.ENOTDIR), "out/C-1.pdf: cannot be written: a file stands where a folder should"},
		{"out/C-1.pdf", errors.Join(wrap(syscall.ENOSPC), nil), "out/C-1.pdf: cannot be written: the disk is full"},
	} {
		if got := unwritable(test.path, test.err).Error(); got != test.want {
			t.Errorf("got  %q\nwant %q", got, test.want)
		}
	}
}

func TestEpoch(t *testing.T) {
	for value, want := range map[string]time.Time{
		"":           {},
		"soon":       {},
		"1767225600": time.Date(2026, 1, 1, 0, 0, 0, 0, time.UTC),
	} {
		t.Setenv("SOURCE_DATE_EPOCH", value)
		if got := epoch(); !got.Equal(want) {
			t.Errorf("SOURCE_DATE_EPOCH=%q: got %v, want %v", value, got, want)
		}
	}
}

// TestProgress wants a line on a terminal that is gone at the end, and nothing
// elsewhere.
func TestProgress(t *testing.T) {
	var err strings.Builder
	term := &terminal{err: &err, live: true}
	end := term.progress(func() string { return "computing" })
	time.Sleep(patience + patience/10)
	end()
	if got := err.String(); !strings.HasPrefix(got, "\r\x1b[Kcomputing") || !strings.HasSuffix(got, "\r\x1b[K") {
		t.Errorf("got %q", got)
	}
	err.Reset()
	term.progress(func() string { return "computing" })()
	(&terminal{err: &err}).progress(func() string { return "computing" })()
	if err.Len() > 0 {
		t.Errorf("got %q", err.String())
	}
}
