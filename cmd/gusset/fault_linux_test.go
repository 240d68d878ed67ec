package main

import (
	"errors"
	"os"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
)

// smallDisk mounts a disk of a few hundred kilobytes, which root alone may do.
func smallDisk(t *testing.T, size string) string {
	t.Helper()
	dir := t.TempDir()
	if err := syscall.Mount("tmpfs", dir, "tmpfs", 0, "size="+size); err != nil {
		t.Skipf("a disk cannot be mounted here: %v", err)
	}
	t.Cleanup(func() { _ = syscall.Unmount(dir, syscall.MNT_DETACH) })
	return dir
}

// fill takes all that is left of a disk.
func fill(t *testing.T, file string) {
	t.Helper()
	f, err := os.Create(file)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	for block := make([]byte, 4096); err == nil; {
		_, err = f.Write(block)
	}
	if !errors.Is(err, syscall.ENOSPC) {
		t.Fatal(err)
	}
}

// TestFullDisk fills the disk that pages are written to: the old ones stay, the
// message says so, and once there is room the new ones are written.
func TestFullDisk(t *testing.T) {
	dir, disk := t.TempDir(), smallDisk(t, "2m")
	page := filepath.Join(disk, "C-1.html")
	write(t, filepath.Join(dir, "lug.md"), lug("48"))
	p := startWatch(t, dir, "lug.md", "--to", disk)
	old := read(t, page)
	fill(t, filepath.Join(disk, "filling"))

	write(t, filepath.Join(dir, "lug.md"), lug("49"))
	p.wait(t, "C-1.html: cannot be written: the disk is full; the old one stays")
	p.wait(t, "lug.md: not written; the last good pages stay")
	out, status := gussetIn(t, dir, "print", "lug.md", "--to", disk)
	if want := "gusset: " + page + ": cannot be written: the disk is full; the old one stays\n"; status != statusMisuse || !strings.Contains(out, want) {
		t.Errorf("status %d: %s", status, out)
	}
	if read(t, page) != old {
		t.Error("the old page did not stay")
	}
	if left, _ := filepath.Glob(filepath.Join(disk, temporary+"*")); len(left) > 0 {
		t.Errorf("something is left beside the pages: %v", left)
	}

	if err := os.Remove(filepath.Join(disk, "filling")); err != nil {
		t.Fatal(err)
	}
	p.wait(t, "lug.md: P 48 → 49 kN")
	p.interrupt(t)
}

// TestReadOnlyDisk turns the disk that pages are written to read-only and back.
func TestReadOnlyDisk(t *testing.T) {
	dir, disk := t.TempDir(), smallDisk(t, "4m")
	write(t, filepath.Join(dir, "lug.md"), lug("48"))
	p := startWatch(t, dir, "lug.md", "--to", disk)
	remount := func(flags uintptr) {
		if err := syscall.Mount("tmpfs", disk, "tmpfs", syscall.MS_REMOUNT|flags, "size=4m"); err != nil {
			t.Fatal(err)
		}
	}
	remount(syscall.MS_RDONLY)
	write(t, filepath.Join(dir, "lug.md"), lug("49"))
	p.wait(t, "C-1.html: cannot be written: the disk is read-only; the old one stays")
	remount(0)
	p.wait(t, "lug.md: P 48 → 49 kN")
	p.interrupt(t)
}

// TestUnreadable wants a file that may not be read told by name.
func TestUnreadable(t *testing.T) {
	dir := t.TempDir()
	if err := syscall.Mkfifo(filepath.Join(dir, "pipe.md"), 0o666); err != nil {
		t.Fatal(err)
	}
	out, status := gussetIn(t, dir, "run", "pipe.md")
	if status != statusMisuse || !strings.Contains(out, "gusset: pipe.md: it is no ordinary file") {
		t.Errorf("status %d: %s", status, out)
	}
	if os.Geteuid() == 0 {
		return // root may read everything
	}
	write(t, filepath.Join(dir, "secret.md"), lug("48"))
	if err := os.Chmod(filepath.Join(dir, "secret.md"), 0); err != nil {
		t.Fatal(err)
	}
	out, status = gussetIn(t, dir, "run", "secret.md")
	if status != statusMisuse || !strings.Contains(out, "gusset: secret.md: it may not be read") {
		t.Errorf("status %d: %s", status, out)
	}
	locked := filepath.Join(dir, "locked")
	if err := os.Mkdir(locked, 0); err != nil {
		t.Fatal(err)
	}
	if out, status = gussetIn(t, dir, "print", "locked"); status != statusMisuse || out != "gusset: locked: it may not be read\n" {
		t.Errorf("status %d: %s", status, out)
	}
	if err := os.Chmod(locked, 0o300); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = os.Chmod(locked, 0o700) }) // so that it can be removed
	write(t, filepath.Join(locked, "lug.md"), lug("48"))
	if out, status = gussetIn(t, dir, "print", "locked/lug.md"); status != statusMisuse || out != "gusset: locked: it may not be read\n" {
		t.Errorf("status %d: %s", status, out)
	}
}
