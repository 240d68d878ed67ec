package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"syscall"

	"gusset/notebook"
)

// found is what the paths of a command line stand for.
type found struct {
	files    []string // calc files, each once, in order
	folders  []string // the folders that were walked, each path's own first
	problems []error
}

// find lists the calc files that paths stand for: files as they are named, and
// in folders every calc file, at any depth, and those that were known for one.
// Other Markdown is passed over, and so are links, and files and folders whose
// name starts with a dot.
func find(paths []string, known ...string) found {
	f := finder{known: known, seen: map[string]bool{}}
	for _, path := range paths {
		info, err := os.Stat(path)
		switch {
		case err != nil:
			f.problem(path, err)
		case info.IsDir():
			f.walk(path)
		default:
			f.add(path)
		}
	}
	return f.found
}

type finder struct {
	found
	known []string
	seen  map[string]bool // by real path
}

func (f *finder) problem(path string, err error) {
	if errors.Is(err, fs.ErrPermission) {
		err = errors.New("it may not be read")
	}
	f.problems = append(f.problems, fmt.Errorf("%s: %w", path, cause(err)))
}

func (f *finder) add(file string) {
	real, err := filepath.EvalSymlinks(file)
	if err == nil {
		real, err = filepath.Abs(real)
	}
	if err != nil {
		f.problem(file, err)
		return
	}
	if !f.seen[real] {
		f.seen[real] = true
		f.files = append(f.files, file)
	}
}

func (f *finder) walk(folder string) {
	any, told := false, len(f.problems)
	folder = filepath.Clean(folder)
	through := folder + string(filepath.Separator) // through the link that it may be
	_ = filepath.WalkDir(through, func(path string, entry fs.DirEntry, err error) error {
		path = filepath.Clean(path)
		switch {
		case err != nil:
			f.problem(path, err)
		case path != folder && strings.HasPrefix(entry.Name(), "."):
			if entry.IsDir() {
				return filepath.SkipDir
			}
		case entry.IsDir():
			f.folders = append(f.folders, path)
		case entry.Type().IsRegular() && isMarkdown(path):
			calc, err := isCalc(path)
			if err != nil {
				f.problem(path, err)
			} else if calc || slices.Contains(f.known, path) {
				f.add(path)
				any = true
			}
		}
		return nil
	})
	if !any && len(f.problems) == told {
		f.problems = append(f.problems, fmt.Errorf("%s: no calc files in this folder\na calc file is Markdown whose front matter has the key `calc`", folder))
	}
}

func isMarkdown(path string) bool {
	ext := strings.ToLower(filepath.Ext(path))
	return ext == ".md" || ext == ".markdown"
}

// frontBound is how much of a Markdown file is read to see whether it is a
// calc file. Front matter has a few hundred bytes.
const frontBound = 1 << 20

func isCalc(path string) (bool, error) {
	file, err := os.Open(path)
	if err != nil {
		return false, err
	}
	defer file.Close()
	text, err := io.ReadAll(io.LimitReader(file, frontBound))
	if err != nil {
		return false, err
	}
	return notebook.IsCalc(text), nil
}

// cause puts a file system's error into words, without its calls and paths.
func cause(err error) error {
	var path *fs.PathError
	var link *os.LinkError
	var call *os.SyscallError
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return errors.New("there is no such file or folder")
	case errors.Is(err, fs.ErrPermission):
		return errors.New("permission denied")
	case errors.Is(err, syscall.ENOSPC):
		return errors.New("the disk is full")
	case errors.Is(err, syscall.EDQUOT):
		return errors.New("the disk quota is used up")
	case errors.Is(err, syscall.EROFS):
		return errors.New("the disk is read-only")
	case errors.As(err, &path):
		return path.Err
	case errors.As(err, &link):
		return link.Err
	case errors.As(err, &call):
		return call.Err
	}
	return err
}
