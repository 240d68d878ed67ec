package main

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"syscall"
	"time"
	"unicode"

	"golang.org/x/sync/errgroup"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/notebook/store"
	"gusset/render"
	"gusset/render/html"
	"gusset/render/pdf"
)

// printer writes the pages of compiled calcs.
type printer struct {
	to   string // the folder, "" for beside each source
	only string // "html", "pdf", or "" for both
}

func (p *printer) check() error {
	if p.only != "" && p.only != "html" && p.only != "pdf" {
		return fmt.Errorf("`--only` is pdf or html, not `%s`", p.only)
	}
	if info, err := os.Stat(p.to); p.to != "" && err == nil && !info.IsDir() {
		return fmt.Errorf("%s: it is a file, and `--to` names a folder", p.to)
	}
	return nil
}

// folder is where the pages of a calc file go.
func (p *printer) folder(file string) string {
	if p.to != "" {
		return p.to
	}
	return filepath.Dir(file)
}

// stem is the path of a calc's pages without `.html` and `.pdf`. It is empty
// where the calc's number has nothing that a file can be named by.
func (p *printer) stem(file string, s *notebook.Sheet) string {
	name := fileName(s.Front.Calc)
	if name == "" {
		return ""
	}
	if rev := fileName(s.Front.Rev); rev != "" {
		name += "_" + rev
	}
	return filepath.Join(p.folder(file), name)
}

// fileName cleans a number or a revision to what is safe in every file's name:
// letters, figures, `.`, `_` and `-`. A run of anything else becomes one hyphen,
// and none stands at an end; nor does a dot, which would hide the file.
func fileName(s string) string {
	var b strings.Builder
	gap := false
	for _, r := range s {
		if !unicode.IsLetter(r) && !unicode.IsDigit(r) && !unicode.Is(unicode.Mn, r) && !strings.ContainsRune("._-", r) {
			gap = true
			continue
		}
		if gap {
			b.WriteByte('-')
			gap = false
		}
		b.WriteRune(r)
	}
	return strings.Trim(b.String(), ".-")
}

// stems names the pages of every calc that can be printed. Two calcs that would
// be written to one name are an error each, and so is one without a name.
// Names are compared as a disk does that holds capitals and small letters for one.
func (p *printer) stems(results []store.Result) (stems []string, problems []error) {
	stems = make([]string, len(results))
	first := map[string]int{}
	clash := map[int]bool{}
	for i, r := range results {
		if r.Sheet == nil || r.Sheet.Failed() {
			continue
		}
		stem := p.stem(r.File, r.Sheet)
		if stem == "" {
			problems = append(problems, fmt.Errorf("%s: the calc's number `%s` has no letter or figure to name a file by", r.File, r.Sheet.Front.Calc))
			continue
		}
		stems[i] = stem
		key := strings.ToLower(absolute(stem))
		j, taken := first[key]
		if !taken {
			first[key] = i
			continue
		}
		clash[i], clash[j] = true, true
		problems = append(problems, fmt.Errorf("%s and %s would both be written to %s\ngive one of them another number or revision; neither was written",
			results[j].File, r.File, filepath.Base(stems[j])))
	}
	for i := range clash {
		stems[i] = ""
	}
	return stems, problems
}

// written is what became of a calc's pages.
type written struct {
	files    []string          // that were written, in order
	warnings []diag.Diagnostic // of the PDF
	err      error             // the first that could not be written
}

// write writes a calc's pages. The HTML is on the disk before the PDF is made.
func (p *printer) write(s *notebook.Sheet, stem string) (w written) {
	defer func() {
		if r := recover(); r != nil {
			w.err = fmt.Errorf("internal error while printing %s: %v\nthis is a fault of the program, not of the calc; please report it with the file", s.Source.Name, r)
		}
	}()
	if w.err = os.MkdirAll(filepath.Dir(stem), 0o777); w.err != nil {
		w.err = unwritable(filepath.Dir(stem), w.err)
		return w
	}
	page := render.NewPage(s)
	put := func(ext string, data []byte, err error) {
		file := stem + ext
		if err == nil {
			err = writeWhole(file, data)
		}
		if err == nil {
			w.files = append(w.files, file)
		} else if w.err == nil {
			w.err = unwritable(file, err)
		}
	}
	if p.only != "pdf" {
		put(".html", html.Append(nil, page), nil)
	}
	if p.only != "html" {
		w.warnings = pdf.Unsupported(page)
		data, err := pdf.Write(page, epoch())
		put(".pdf", data, err)
	}
	return w
}

// writeAll writes many calcs' pages at once; an empty stem is passed over.
func (p *printer) writeAll(results []store.Result, stems []string, done func()) []written {
	out := make([]written, len(results))
	swept := map[string]bool{}
	for _, stem := range stems {
		if dir := filepath.Dir(stem); stem != "" && !swept[dir] {
			swept[dir] = true
			sweep(dir)
		}
	}
	work := &errgroup.Group{}
	work.SetLimit(parallel())
	for i, stem := range stems {
		if stem != "" {
			work.Go(func() error {
				out[i] = p.write(results[i].Sheet, stem)
				done()
				return nil
			})
		}
	}
	_ = work.Wait() // the errors are in out
	return out
}

// unwritable says which path cannot be written and why, and that what stood
// there still does.
func unwritable(path string, err error) error {
	if info, there := os.Lstat(path); there == nil && info.Mode()&fs.ModeSymlink != 0 && stampOf(path).info == nil {
		return fmt.Errorf("%s: cannot be written: it is a link that leads nowhere", path)
	}
	if errors.Is(err, syscall.EISDIR) || errors.Is(err, syscall.EEXIST) {
		return fmt.Errorf("%s: cannot be written: a folder has this name", path)
	}
	if errors.Is(err, syscall.ENOTDIR) {
		return fmt.Errorf("%s: cannot be written: a file stands where a folder should", path)
	}
	kept := ""
	if _, there := os.Stat(path); there == nil {
		kept = "; the old one stays"
	}
	return fmt.Errorf("%s: cannot be written: %w%s", path, cause(err), kept)
}

// epoch is the date that build systems set for reproducible files, zero where
// none is set. A calc's own date goes before it.
func epoch() time.Time {
	seconds, err := strconv.ParseInt(os.Getenv("SOURCE_DATE_EPOCH"), 10, 64)
	if err != nil {
		return time.Time{}
	}
	return time.Unix(seconds, 0).UTC()
}

// verdictLine sums a calc's checks up in a few words.
func verdictLine(s *notebook.Sheet) string {
	count := map[string]int{}
	for _, l := range s.Listing() {
		if l.Kind == notebook.CheckLine {
			count[l.Verdict]++
		}
	}
	if line := checksLine(count); line != "" {
		return line
	}
	return "no checks"
}

// names are files without their folders.
func names(files []string) string {
	short := slices.Clone(files)
	for i, f := range short {
		if i > 0 {
			short[i] = filepath.Base(f)
		}
	}
	return strings.Join(short, ", ")
}
