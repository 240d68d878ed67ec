package main

import (
	"bytes"
	"path/filepath"
	"syscall"
	"testing"
)

// full is a stream to a disk without room.
type full struct{}

func (full) Write([]byte) (int, error) { return 0, syscall.ENOSPC }

// TestFullOutput wants every verb to tell that its results cannot be written.
func TestFullOutput(t *testing.T) {
	dir := t.TempDir()
	file := filepath.Join(dir, "lug.md")
	write(t, file, lug("48"))
	for _, args := range [][]string{
		{"run", file}, {"run", "--json", file}, {"run", "--stage", "tree", file}, {"print", file},
		{"new", filepath.Join(dir, "new.md")}, {"notation"}, {"helpers"}, {"helpers", "key_shear"},
		{"units"}, {"units", "48 kip", "kN"}, {"completion", "bash"}, {"--help"}, {"--version"},
	} {
		var told bytes.Buffer
		status := gusset(args, &terminal{out: full{}, err: &told})
		want := "gusset: the results cannot be written (the disk is full)\n"
		if status != statusMisuse || !bytes.HasSuffix(told.Bytes(), []byte(want)) {
			t.Errorf("%q: status %d: %s", args, status, told.String())
		}
	}
}
