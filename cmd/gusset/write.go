package main

import (
	"crypto/rand"
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"time"
)

// temporary starts the name of a file that is being written.
const temporary = ".gusset-"

// writeWhole writes a file so that whoever looks, at whatever moment, finds the
// old one or the new one whole: the bytes go to a temporary name beside the
// target, are flushed to the disk, and take the target's name.
func writeWhole(file string, data []byte) error {
	dir := filepath.Dir(file)
	name := filepath.Join(dir, temporary+rand.Text())
	mode := fs.FileMode(0o666) // less the umask
	out, err := os.OpenFile(name, os.O_WRONLY|os.O_CREATE|os.O_EXCL, mode)
	if err != nil {
		return err
	}
	_, err = out.Write(data)
	err = errors.Join(err, out.Sync(), out.Close())
	if err == nil {
		err = os.Rename(name, file)
	}
	if err != nil {
		return errors.Join(err, os.Remove(name))
	}
	flushFolder(dir)
	return nil
}

// flushFolder puts a folder's new name on the disk. Where a file system cannot
// do so the file is whole all the same.
func flushFolder(dir string) {
	if d, err := os.Open(dir); err == nil {
		_ = d.Sync()
		d.Close()
	}
}

// leftFor is how long a temporary file must lie untouched before it counts as
// left behind by a process that was killed.
const leftFor = time.Hour

// sweep removes temporary files that killed processes left in a folder.
func sweep(dir string) {
	entries, err := os.ReadDir(dir)
	if err != nil {
		return
	}
	for _, e := range entries {
		if !strings.HasPrefix(e.Name(), temporary) || !e.Type().IsRegular() {
			continue
		}
		if info, err := e.Info(); err == nil && time.Since(info.ModTime()) > leftFor {
			_ = os.Remove(filepath.Join(dir, e.Name()))
		}
	}
}
