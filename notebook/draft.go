package notebook

import (
	"fmt"
	"path"
	"regexp"
	"runtime/debug"
	"slices"
	"strings"

	"github.com/yuin/goldmark/ast"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// Draft is a calc file that was read and parsed, with everything that it names
// but other calc files' results. It never changes once Read has returned it.
type Draft struct {
	Path  string
	Files []string // all files it was read from or looked for, within the root, sorted; itself included

	ctx     *Context
	limit   string // the folder that nothing outside of is read
	source  *diag.Source
	front   Front
	doc     ast.Node
	remarks []remark
	blocks  []*syntax.Block
	texts   []syntax.ValueRef
	helpers []*check.HelperFile
	tables  map[string]table // CSV files by the name that the schedule gives
	images  map[string]*Image
	diags   []diag.Diagnostic
	dead    bool // it is no text, or has no front matter: there is nothing to compute
	missing error
}

// table is a CSV file, or why it cannot be had.
type table struct {
	src *diag.Source
	bad *fault
}

// Carries lists the calc files it carries values from, in order.
func (d *Draft) Carries() []string {
	var paths []string
	for _, l := range d.front.From {
		if l.Path != "" {
			paths = append(paths, l.Path)
		}
	}
	return paths
}

// Read reads a calc file of the root. What is wrong with it is in the sheet
// that Compute makes of it.
func Read(c *Context, file string) (d *Draft) {
	file = path.Clean(file)
	d = &Draft{Path: file, ctx: c, limit: ".", front: Front{Paper: "A4"}, doc: ast.NewDocument(), images: map[string]*Image{}}
	if !c.Panics {
		defer func() {
			if r := recover(); r != nil {
				d.dead = true
				d.front.From = nil
				d.diags = []diag.Diagnostic{internal(d.source, file, r)}
			}
		}()
	}
	d.watched(file)
	d.source = diag.NewSource(c.shown(file), nil)
	d.read()
	slices.Sort(d.Files)
	d.Files = slices.Compact(d.Files)
	return d
}

// internal is the diagnostic for a bug of the program.
func internal(src *diag.Source, file string, cause any) diag.Diagnostic {
	d := diag.Diagnostic{
		ID: diag.Internal, Source: src,
		Message: fmt.Sprintf("internal error while compiling %s: %v", file, cause),
		Hints:   []string{"this is a fault of the program, not of the calc; please report it with the file"},
	}
	if at := faultLine.FindStringSubmatch(string(debug.Stack())); at != nil {
		d.Hints = append(d.Hints, "at "+at[1])
	}
	return d
}

// faultLine finds the place in a stack trace that panicked: the first frame of
// the project's below the runtime's.
var faultLine = regexp.MustCompile(`(?s)panic\(.*?\n\S[^\n]*\n\t\S*?((?:units|notebook)/\S+:\d+)`)

func (d *Draft) watched(file string) { d.Files = append(d.Files, file) }

func (d *Draft) stop(f diag.Diagnostic) {
	d.dead = true
	d.diags = append(d.diags, f)
}

func (d *Draft) read() {
	text, f := readBounded(d.ctx.FS, d.Path)
	if f != nil {
		if f.id == diag.MissingFile {
			d.missing = fmt.Errorf("%s: %s", d.source.Name, f.message)
		}
		d.stop(f.at(d.source, diag.Span{}))
		return
	}
	src, bad := checkText(d.source.Name, text)
	d.source = src
	if bad != nil {
		d.stop(*bad)
		return
	}
	front, body, ok := cutFront(src.Text)
	if !ok {
		d.stop(noFront(src, front))
		return
	}
	if hidden := checkHidden(src); hidden != nil {
		d.diags = append(d.diags, *hidden)
	}
	d.readRegister()
	d.readFront(front)
	d.checkKeys()
	d.readHelpers()
	d.parse(body)
	d.readTables()
}

func noFront(src *diag.Source, at diag.Span) diag.Diagnostic {
	bad := diag.Diagnostic{
		ID: diag.FrontMatter, Source: src, Message: "the file has no front matter",
		Hints: []string{"a calc file starts with the lines `---`, `calc: C-104`, `---`"},
	}
	switch {
	case len(strings.TrimSpace(string(src.Text))) == 0:
		bad.Message = "the file is empty"
	case at.Start == 0:
		bad.Message, bad.Span = "the front matter is never closed", at
		bad.Hints = []string{"a line `---` ends it"}
	}
	return bad
}

// checkKeys reports two files under one key and keeps the first.
func (d *Draft) checkKeys() {
	first := map[string]diag.Span{}
	taken := func(l Link) bool {
		at, ok := first[l.Key]
		if !ok {
			first[l.Key] = l.keyAt
			return false
		}
		d.diags = append(d.diags, diag.Diagnostic{
			ID: diag.Redefined, Source: d.source, Span: l.keyAt,
			Message: fmt.Sprintf("`%s` is the key of two files, first in line %d", d.source.Slice(l.keyAt), d.source.LineAt(at.Start)),
			Hints:   []string{"give one of them another key"},
		})
		return true
	}
	d.front.From = slices.DeleteFunc(d.front.From, taken)
	d.front.Helpers = slices.DeleteFunc(d.front.Helpers, taken)
}

// within resolves a file's name as it is written in the calc: relative to a
// folder, with slashes, and not out of the root.
func (d *Draft) within(dir, ref string) (string, *fault) {
	bad := func(format string, hints ...string) (string, *fault) {
		return "", &fault{diag.MissingFile, fmt.Sprintf(format, ref), hints}
	}
	switch {
	case strings.ContainsRune(ref, '\\'):
		return bad("`%s` has backslashes", "folders are parted by `/`: `"+strings.ReplaceAll(ref, `\`, "/")+"`")
	case path.IsAbs(ref) || len(ref) > 1 && ref[1] == ':':
		return bad("`%s` starts at the top of a disk", "name the file from the calc's own folder")
	}
	file := path.Join(dir, ref)
	inside := d.limit == "." || file == d.limit || strings.HasPrefix(file, d.limit+"/")
	if file == ".." || strings.HasPrefix(file, "../") || !inside {
		return bad("`%s` leaves the root folder, and no file outside it is read",
			"the root is the folder of the nearest register.yaml above the calc, else the calc's own")
	}
	if file == "." {
		return bad("`%s` is a folder")
	}
	return file, nil
}

// file reads a text file that the calc names.
func (d *Draft) file(name string) (*diag.Source, *fault) {
	d.watched(name)
	text, f := readBounded(d.ctx.FS, name)
	if f != nil {
		return nil, f
	}
	src, bad := checkText(d.ctx.shown(name), text)
	if bad != nil {
		return nil, &fault{bad.ID, bad.Message, bad.Hints}
	}
	if hidden := checkHidden(src); hidden != nil {
		d.diags = append(d.diags, *hidden)
	}
	return src, nil
}

// libraryPrefix starts the names of tables that ship with the program.
const libraryPrefix = "library/"

// readTables reads the CSV files that schedules name.
func (d *Draft) readTables() {
	d.tables = map[string]table{}
	for _, b := range d.blocks {
		if b.Table == nil || b.Table.From == "" || strings.HasPrefix(b.Table.From, libraryPrefix) {
			continue
		}
		ref := b.Table.From
		if _, ok := d.tables[ref]; ok {
			continue
		}
		d.tables[ref] = d.readTable(ref)
	}
}

func (d *Draft) readTable(ref string) table {
	file, bad := d.within(path.Dir(d.Path), ref)
	if bad != nil {
		return table{bad: bad}
	}
	src, bad := d.file(file)
	if bad != nil {
		bad = bad.of(ref)
		if bad.id == diag.MissingFile {
			bad.hints = []string{"the path is taken from the calc file's folder, or `library/…` for a table that ships with the program"}
		}
	}
	return table{src, bad}
}

// table hands on a CSV file that was read.
func (d *Draft) table(ref string) (*diag.Source, *diag.Diagnostic) {
	t := d.tables[ref]
	if t.bad != nil {
		bad := t.bad.at(nil, diag.Span{})
		return nil, &bad
	}
	return t.src, nil
}
