package notebook

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"strings"
	"unicode"
	"unicode/utf8"

	"gusset/notebook/diag"
)

// maxFile bounds every file that is read. A calc of 500 pages has one
// megabyte, a photograph from a site visit ten.
const maxFile = 16 << 20

// fault is why a file, or a line of a front matter, cannot be used.
type fault struct {
	id      string
	message string
	hints   []string
}

func (f *fault) Error() string { return f.message }

func (f *fault) at(src *diag.Source, at diag.Span) diag.Diagnostic {
	return diag.Diagnostic{ID: f.id, Message: f.message, Hints: f.hints, Source: src, Span: at}
}

// of says which file the fault is one of.
func (f *fault) of(name string) *fault {
	return &fault{f.id, "`" + name + "`: " + f.message, f.hints}
}

// reason puts a file system's error into words.
func reason(err error) string {
	var pathErr *fs.PathError
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return "there is no such file"
	case errors.Is(err, fs.ErrPermission):
		return "it may not be read"
	case errors.Is(err, fs.ErrInvalid):
		return "its name is no text in UTF-8"
	case strings.Contains(err.Error(), "escapes from parent"):
		return "it is a link that leads out of the root folder"
	case errors.As(err, &pathErr):
		return "it cannot be read (" + pathErr.Err.Error() + ")"
	}
	return "it cannot be read (" + err.Error() + ")"
}

// readBounded reads a file of the root. What is no ordinary file is not opened:
// a pipe would never end.
func readBounded(fsys fs.FS, path string) ([]byte, *fault) {
	missing := func(words string) *fault { return &fault{id: diag.MissingFile, message: words} }
	info, err := fs.Stat(fsys, path)
	if err != nil {
		return nil, missing(reason(err))
	}
	switch {
	case info.IsDir():
		return nil, missing("it is a folder")
	case !info.Mode().IsRegular():
		return nil, missing("it is no ordinary file")
	case info.Size() > maxFile:
		return nil, tooLarge(info.Size())
	}
	file, err := fsys.Open(path)
	if err != nil {
		return nil, missing(reason(err))
	}
	defer file.Close()
	var text bytes.Buffer
	text.Grow(int(info.Size()) + bytes.MinRead)
	if _, err := text.ReadFrom(io.LimitReader(file, maxFile+1)); err != nil {
		return nil, missing(reason(err))
	}
	if text.Len() > maxFile {
		return nil, tooLarge(int64(text.Len()))
	}
	return text.Bytes(), nil
}

func tooLarge(size int64) *fault {
	return &fault{id: diag.BoundExceeded, message: fmt.Sprintf("it has %d MB, and a file may have %d MB at most", (size+(1<<20)-1)>>20, maxFile>>20)}
}

// checkText finds what keeps a file from being text. The source it returns can
// be shown even so: each byte that is no character stands as `?`.
func checkText(name string, text []byte) (*diag.Source, *diag.Diagnostic) {
	if utf8.Valid(text) && bytes.IndexByte(text, 0) < 0 {
		return diag.NewSource(name, text), nil
	}
	clean := bytes.Clone(text)
	first := -1
	for i := 0; i < len(clean); {
		r, size := utf8.DecodeRune(clean[i:])
		if r == utf8.RuneError && size <= 1 || r == 0 {
			if first < 0 {
				first = i
			}
			clean[i] = '?'
		}
		i += size
	}
	bad := text[first]
	d := &diag.Diagnostic{ID: diag.UnsupportedCharacter}
	switch {
	case bytes.HasPrefix(text, []byte("\xff\xfe")) || bytes.HasPrefix(text, []byte("\xfe\xff")):
		d.Message = "the file is UTF-16, not UTF-8"
	case bad == 0:
		d.Message = "a NUL byte: the file is no text"
	default:
		d.Message = fmt.Sprintf("the byte 0x%02X is no UTF-8, so the file is in another encoding", bad)
	}
	if bad != 0 {
		d.Hints = []string{"save the file as UTF-8"}
	}
	src := diag.NewSource(name, clean)
	first -= len(clean) - len(src.Text)
	d.Source, d.Span = src, diag.Span{Start: first, End: first + 1}
	return src, d
}

// hidden tells whether a character does not show but changes how the text
// around it is read: control characters and the marks that turn the direction
// of writing.
func hidden(r rune) bool {
	return unicode.IsControl(r) && r != '\n' && r != '\r' && r != '\t' || unicode.Is(unicode.Bidi_Control, r)
}

// checkHidden warns of the first hidden character, and says how many there are.
func checkHidden(src *diag.Source) *diag.Diagnostic {
	var d *diag.Diagnostic
	count := 0
	for i, size := 0, 1; i < len(src.Text); i += size {
		r := rune(src.Text[i])
		if size = 1; r >= utf8.RuneSelf {
			r, size = utf8.DecodeRune(src.Text[i:])
		}
		if r >= ' ' && r < 0x7F || !hidden(r) {
			continue
		}
		if count++; d == nil {
			d = &diag.Diagnostic{
				Severity: diag.Warning, ID: diag.UnsupportedCharacter, Source: src,
				Span: diag.Span{Start: i, End: i + size},
			}
			what := "a control character"
			if unicode.Is(unicode.Bidi_Control, r) {
				what = "a mark that turns the direction of writing"
			}
			d.Message = fmt.Sprintf("U+%04X is %s: what follows may not be what it looks like", r, what)
		}
	}
	if count > 1 {
		d.Hints = []string{fmt.Sprintf("the file has %d such characters", count)}
	}
	return d
}
