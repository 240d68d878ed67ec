package notebook

import (
	"bytes"
	"errors"
	"fmt"
	"io/fs"
	"path"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"time"
	"unicode/utf8"

	"go.yaml.in/yaml/v3"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// The keys of a calc's front matter, and those of a register: what all calcs
// of a package share. Who prepared and checked a calc, its revision and its date are its
// own; a register cannot sign for it.
var (
	calcKeys = []string{
		"calc", "title", "project", "client", "firm", "job", "logo", "rev", "status", "date",
		"by", "checked", "approved", "system", "units", "figures", "paper", "from", "helpers",
	}
	registerKeys = []string{"project", "client", "firm", "job", "logo", "system", "units", "figures", "paper"}
)

// maxFigures bounds the figures that a calc may ask for. More a float64 does not have.
const maxFigures = 15

// MaxNumber bounds the characters of a calc's number and of its revision, which
// name the files that are written.
const MaxNumber = 100

// cutFront finds the front matter of a text: the lines between `---` in the
// first line and the next `---` or `...`. body is the offset of what follows.
// ok is false where the text does not start with `---` or no end is found;
// front.Start is then -1 in the first case.
func cutFront(text []byte) (front diag.Span, body int, ok bool) {
	offset := 0
	for line := range bytes.Lines(text) {
		mark := string(bytes.TrimRight(line, " \t\r\n"))
		start := offset
		offset += len(line)
		switch {
		case start == 0 && mark != "---":
			return diag.Span{Start: -1}, 0, false
		case start == 0:
			front.Start = offset
		case mark == "---" || mark == "...":
			front.End = start
			return front, offset, true
		}
	}
	if offset == 0 {
		return diag.Span{Start: -1}, 0, false
	}
	return diag.Span{Start: 0, End: 3}, 0, false
}

// readFront reads the front matter of the draft's source over what the register
// gives.
func (d *Draft) readFront(at diag.Span) {
	y := &yamlReader{src: d.source, at: at, id: diag.FrontMatter, what: "front matter"}
	list := y.entries()
	f := &frontReader{yamlReader: y, draft: d, front: &d.front, dir: path.Dir(d.Path)}
	found := false
	for _, e := range list {
		switch {
		case !slices.Contains(calcKeys, e.key):
			y.unknown(e, calcKeys)
		default:
			found = found || e.key == "calc"
			f.set(e)
		}
	}
	if list != nil && !found {
		hint := "a calc file has its number there: `calc: C-104`"
		y.report(diag.Error, diag.Span{Start: 0, End: 3}, "the front matter has no key `calc`", hint)
	}
	d.diags = append(d.diags, y.diags...)
}

// readRegister fills the front from the nearest register.yaml at or above the
// calc's folder. Its folder is as far as the calc may reach.
func (d *Draft) readRegister() {
	dir := path.Dir(d.Path)
	for {
		name := path.Join(dir, RegisterName)
		d.watched(name)
		if d.isRegister(name) {
			d.limit = dir
			if text, f := readBounded(d.ctx.FS, name); f == nil {
				d.readRegisterText(name, text)
			} else {
				f.id = diag.Register
				d.diags = append(d.diags, f.at(diag.NewSource(d.ctx.shown(name), nil), diag.Span{}))
			}
			return
		}
		if dir == "." {
			return
		}
		dir = path.Dir(dir)
	}
}

// isRegister tells whether a register stands under a name, one that cannot be
// read included: what it says of the package must not be passed over unseen. A
// folder of that name is none.
func (d *Draft) isRegister(name string) bool {
	info, err := fs.Stat(d.ctx.FS, name)
	if err != nil {
		return !errors.Is(err, fs.ErrNotExist)
	}
	return info.Mode().IsRegular()
}

func (d *Draft) readRegisterText(name string, text []byte) {
	src, bad := checkText(d.ctx.shown(name), text)
	if bad != nil {
		bad.ID = diag.Register
		d.diags = append(d.diags, *bad)
		return
	}
	y := &yamlReader{src: src, at: diag.Span{End: len(src.Text)}, id: diag.Register, what: "register"}
	f := &frontReader{yamlReader: y, draft: d, front: &d.front, dir: path.Dir(name)}
	for _, e := range y.entries() {
		switch {
		case slices.Contains(registerKeys, e.key):
			f.set(e)
		case slices.Contains(calcKeys, e.key):
			y.report(diag.Warning, e.keyAt, fmt.Sprintf("`%s` is each calc's own", e.key), "give it in the calc's front matter")
		default:
			y.unknown(e, registerKeys)
		}
	}
	d.diags = append(d.diags, y.diags...)
}

// frontReader turns keys into a Front.
type frontReader struct {
	*yamlReader
	draft *Draft
	front *Front
	dir   string // the folder that paths start from
}

func (f *frontReader) set(e entry) {
	switch front := f.front; e.key {
	case "calc":
		said := len(f.diags)
		front.Calc = f.number(e)
		if front.Calc == "" && len(f.diags) == said {
			f.report(diag.Error, e.keyAt, "`calc` has no number", "give the calc's number in the document register: `calc: C-104`")
		}
	case "rev":
		front.Rev = f.number(e)
	case "title":
		front.Title = f.text(e.key, e.value)
	case "project":
		front.Project = f.text(e.key, e.value)
	case "client":
		front.Client = f.text(e.key, e.value)
	case "firm":
		front.Firm = f.text(e.key, e.value)
	case "job":
		front.Job = f.text(e.key, e.value)
	case "status":
		front.Status = f.text(e.key, e.value)
	case "logo":
		front.Logo = f.logo(e)
	case "date":
		front.Date = f.date(e)
	case "by":
		front.By = f.person(e)
	case "checked":
		front.Checked = f.person(e)
	case "approved":
		front.Approved = f.person(e)
	case "system":
		front.Printing.System = units.SI
		if f.oneOf(e, "SI", "US") == "US" {
			front.Printing.System = units.US
		}
	case "paper":
		front.Paper = f.oneOf(e, "A4", "Letter")
	case "figures":
		front.Printing.Figures = f.figures(e)
	case "units":
		front.Printing.Preferred = f.units(e)
	case "from":
		front.From = f.links(e, "loads: loads.md")
	case "helpers":
		front.Helpers = f.links(e, "shop: helpers/shop.md")
	}
}

// number reads the calc's number or its revision, which name files.
func (f *frontReader) number(e entry) string {
	text := f.text(e.key, e.value)
	if utf8.RuneCountInString(text) > MaxNumber {
		f.diags = append(f.diags, diag.Diagnostic{
			ID: diag.BoundExceeded, Source: f.src, Span: f.span(e.value),
			Message: fmt.Sprintf("`%s` may have %d characters at most", e.key, MaxNumber),
		})
		return ""
	}
	return text
}

// date keeps the text of a date and warns where it is none that sorts.
func (f *frontReader) date(e entry) string {
	text := f.text(e.key, e.value)
	if text == "" {
		return ""
	}
	if _, err := time.Parse(time.DateOnly, text); err != nil {
		f.report(diag.Warning, f.span(e.value), fmt.Sprintf("`%s` is no date of the form 2026-03-02; it is printed as it is", text))
	}
	return text
}

// person reads initials, or a name and a date.
func (f *frontReader) person(e entry) Person {
	if target(e.value).Kind == yaml.ScalarNode {
		return Person{Name: f.text(e.key, e.value)}
	}
	var p Person
	if target(e.value).Kind == yaml.SequenceNode {
		f.report(diag.Error, f.span(e.value), fmt.Sprintf("`%s` is one person: initials, or a name with a date", e.key), fmt.Sprintf("write `%s: {name: KT, date: 2026-03-02}`", e.key))
		return p
	}
	for _, part := range f.mapping(e.value, "`"+e.key+"`") {
		switch part.key {
		case "name":
			p.Name = f.text(part.key, part.value)
		case "date":
			p.Date = f.date(part)
		default:
			f.unknown(part, []string{"name", "date"})
		}
	}
	return p
}

// oneOf reads one of the words; the first stands where another is given.
func (f *frontReader) oneOf(e entry, words ...string) string {
	text := f.text(e.key, e.value)
	if text == "" {
		return words[0]
	}
	for _, w := range words {
		if strings.EqualFold(w, text) {
			return w
		}
	}
	f.errorf(f.span(e.value), "`%s` is %s, not `%s`", e.key, strings.Join(words, " or "), text)
	return words[0]
}

func (f *frontReader) figures(e entry) int {
	text := f.text(e.key, e.value)
	n, err := strconv.Atoi(text)
	if text != "" && (err != nil || n < 1 || n > maxFigures) {
		f.errorf(f.span(e.value), "`figures` is a whole number from 1 to %d, not `%s`", maxFigures, text)
		return 0
	}
	return n
}

// units reads the preferred units.
func (f *frontReader) units(e entry) []units.Unit {
	list, at := f.texts(e.key, e.value, "units: [kN, mm, MPa]")
	var preferred []units.Unit
	for i, text := range list {
		u, err := units.Parse(text)
		if err != nil {
			f.badUnit(at[i], text, err)
			continue
		}
		switch serves := (units.Printing{Preferred: []units.Unit{u}}); {
		case u.Dim().IsNumber():
			f.report(diag.Warning, at[i], fmt.Sprintf("`%s` is a unit of plain numbers, which are printed without one", text),
				fmt.Sprintf("a line that shall be printed in it declares it: `theta [%s] = …`", text))
		case !serves.UnitFor(u.Dim(), u.IsPoint()).Equal(u):
			f.report(diag.Warning, at[i], fmt.Sprintf("`%s` serves no value: its dimension is also that of a moment, which is never printed in it", text))
		default:
			preferred = append(preferred, u)
		}
	}
	return preferred
}

// badUnit reports what keeps a text from being a unit, at its place in it.
func (f *frontReader) badUnit(at diag.Span, text string, err error) {
	bad := diag.Diagnostic{ID: diag.UnknownUnit, Message: err.Error(), Source: f.src, Span: at}
	if pe, ok := err.(*units.ParseError); ok {
		bad.ID, bad.Message = pe.ID, pe.Message
		if f.src.Slice(at) == text {
			bad.Span = diag.Span{Start: at.Start + pe.Start, End: at.Start + pe.End}
		}
		if pe.Fix != "" {
			bad.Hints = []string{fmt.Sprintf("write `%s`", text[:pe.Start]+pe.Fix+text[pe.End:])}
		}
	}
	f.diags = append(f.diags, bad)
}

// keyPattern is what may stand before the dot of `loads.P_u`.
var keyPattern = regexp.MustCompile(`^\pL[\pL\pN_']*$`)

// links reads `from` and `helpers`: files by key.
func (f *frontReader) links(e entry, example string) []Link {
	if v := target(e.value); v.Kind != yaml.MappingNode {
		if v.Kind != yaml.ScalarNode || v.Value != "" {
			f.report(diag.Error, f.span(e.value), fmt.Sprintf("`%s` gives each file a key", e.key), fmt.Sprintf("write `%s: {%s}`", e.key, example))
		}
		return nil
	}
	var list []Link
	for _, part := range f.mapping(e.value, "`"+e.key+"`") {
		key := syntax.Canonical(part.key)
		switch {
		case !keyPattern.MatchString(part.key):
			f.report(diag.Error, part.keyAt, fmt.Sprintf("`%s` cannot stand as a name before a dot", part.key), "a key is a letter, then letters, figures and `_`")
			continue
		case syntax.IsReserved(key):
			f.errorf(part.keyAt, "`%s` is a word of the notation and cannot be a key", part.key)
			continue
		}
		link := Link{Key: key, At: f.span(part.value), keyAt: part.keyAt}
		if ref := f.text(part.key, part.value); ref != "" {
			file, bad := f.draft.within(f.dir, ref)
			if bad != nil {
				f.diags = append(f.diags, bad.at(f.src, link.At))
			}
			link.Path = file
		} else if target(part.value).Kind == yaml.ScalarNode {
			f.errorf(part.keyAt, "`%s` names no file", part.key)
		}
		list = append(list, link)
	}
	return list
}

// logo reads the path of an image beside the file that names it.
func (f *frontReader) logo(e entry) string {
	ref := f.text(e.key, e.value)
	if ref == "" {
		return ""
	}
	file, bad := f.draft.within(f.dir, ref)
	if bad == nil {
		bad = f.draft.image(file, ref)
	}
	if bad != nil {
		f.diags = append(f.diags, bad.at(f.src, f.span(e.value)))
		return ""
	}
	return file
}
