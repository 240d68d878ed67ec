package notebook

import (
	"bytes"
	"encoding/binary"
	"errors"
	"hash/crc32"
	"image"
	"image/gif"
	"image/jpeg"
	"image/png"
	"io/fs"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
	"testing/fstest"
	"time"

	"gusset/notebook/diag"
)

// Files that are no text, by what stands in them.
func TestBytesThatAreNoText(t *testing.T) {
	tests := []struct{ name, text, want string }{
		{"another encoding", calc("Tr\xe4ger"), "4:3 unsupported-character the byte 0xE4 is no UTF-8, so the file is in another encoding\n"},
		{"behind a mark", "\ufeff" + calc("\xe4"), "4:1 unsupported-character the byte 0xE4 is no UTF-8, so the file is in another encoding\n"},
		{"cut off", calc("ä")[:len(calc("ä"))-1], "4:1 unsupported-character the byte 0xC3 is no UTF-8, so the file is in another encoding\n"},
		{"a surrogate", calc("\xed\xa0\x80"), "4:1 unsupported-character the byte 0xED is no UTF-8, so the file is in another encoding\n"},
		{"NUL", calc("a\x00b"), "4:2 unsupported-character a NUL byte: the file is no text\n"},
		{"UTF-16", "\xff\xfe-\x00-\x00", "1:1 unsupported-character the file is UTF-16, not UTF-8\n"},
		{"UTF-16 the other way", "\xfe\xff\x00-\x00-", "1:1 unsupported-character the file is UTF-16, not UTF-8\n"},
		{"empty", "", "1:1 front-matter the file is empty\n"},
		{"blank", " \n\t\n", "1:1 front-matter the file is empty\n"},
		{"only a mark", "\ufeff", "1:1 front-matter the file is empty\n"},
	}
	for _, tt := range tests {
		s := compile(files("a.md", tt.text), "a.md")
		if got := errorsOf(s); got != tt.want {
			t.Errorf("%s: got %q, want %q", tt.name, got, tt.want)
		}
		if s.Doc == nil || !s.Failed() || Status(s) != 1 {
			t.Errorf("%s: the sheet is not fit to be shown as failed", tt.name)
		}
		for _, d := range s.Diagnostics {
			if text := d.Text(); strings.ContainsAny(text, "\x00\ufffd") && !strings.Contains(tt.text, "\ufffd") {
				t.Errorf("%s: the message shows the byte: %q", tt.name, text)
			}
		}
	}
}

// huge is a file system whose one file claims a size and refuses to be read.
type huge struct{ size int64 }

func (h huge) Open(name string) (fs.File, error) { return nil, errors.New("it was read") }
func (h huge) Stat(name string) (fs.FileInfo, error) {
	if name != "a.md" {
		return nil, fs.ErrNotExist
	}
	return info{h.size}, nil
}

type info struct{ size int64 }

func (i info) Name() string       { return "a.md" }
func (i info) Size() int64        { return i.size }
func (i info) Mode() fs.FileMode  { return 0o644 }
func (i info) ModTime() time.Time { return time.Time{} }
func (i info) IsDir() bool        { return false }
func (i info) Sys() any           { return nil }

// A file beyond the bound is refused unread.
func TestHugeFile(t *testing.T) {
	s := Compile(&Context{FS: huge{200 << 20}, Panics: true}, "a.md")
	if got, want := errorsOf(s), "1:1 bound-exceeded it has 200 MB, and a file may have 16 MB at most\n"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}

// Every key's value is the text that the author wrote.
func TestScalarsAreText(t *testing.T) {
	s := compile(files("a.md", strings.ReplaceAll(`---
calc: 0104
title: >
  Lifting lug,
  pin
rev: 1.0
status: N
client: "Yes: it is"
firm: 'O''Brien'
job: 0x1F
project: ~
date: 2026-03-02
by: 007
checked: {name: MV, date: 2026-03-04}
approved:
figures: 04
---
`, "\t", "")), "a.md")
	f := s.Front
	got := strings.Join([]string{f.Calc, f.Title, f.Rev, f.Status, f.Client, f.Firm, f.Job, f.Project, f.Date, f.By.Name, f.Checked.Name, f.Checked.Date, f.Approved.Name}, "|")
	if want := "0104|Lifting lug, pin|1.0|N|Yes: it is|O'Brien|0x1F|~|2026-03-02|007|MV|2026-03-04|"; got != want || errorsOf(s) != "" || f.Printing.Figures != 4 {
		t.Errorf("got %q, want %q; %s", got, want, errorsOf(s))
	}
}

// What a register sets stands where the calc says nothing, and the nearest
// register is the one that counts.
func TestRegister(t *testing.T) {
	root := files(
		"register.yaml", "firm: Works\nclient: Bridge\nunits: [N, m]\npaper: Letter\nlogo: logo.png\n",
		"logo.png", string(pngOf(t, 3, 2)),
		"a.md", "---\ncalc: C-1\nclient: Tower\nunits: [kN]\n---\n",
		"sub/b.md", "---\ncalc: C-2\nclient:\n---\n",
		"sub/deep/register.yaml", "firm: Other\n",
		"sub/deep/c.md", "---\ncalc: C-3\nfrom: {a: ../../a.md}\n---\n",
	)
	a, b, c := compile(root, "a.md"), compile(root, "sub/b.md"), compile(root, "sub/deep/c.md")
	if f := a.Front; f.Firm != "Works" || f.Client != "Tower" || f.Paper != "Letter" || len(f.Printing.Preferred) != 1 || f.Logo != "logo.png" || a.Images["logo.png"].Width != 3 {
		t.Errorf("%+v", f)
	}
	if f := b.Front; f.Firm != "Works" || f.Client != "" || len(f.Printing.Preferred) != 2 || f.Logo != "logo.png" {
		t.Errorf("%+v", f)
	}
	if f := c.Front; f.Firm != "Other" || f.Client != "" || f.Paper != "A4" {
		t.Errorf("%+v", f)
	}
	if got := errorsOf(c); !strings.Contains(got, "`../../a.md` leaves the root folder") {
		t.Errorf("a file above its register was read: %s", got)
	}
}

func pngOf(t *testing.T, w, h int) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := png.Encode(&b, image.NewGray(image.Rect(0, 0, w, h))); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

// Images are taken by what they are, and only whole.
func TestImages(t *testing.T) {
	var j, g bytes.Buffer
	gray := image.NewGray(image.Rect(0, 0, 70, 50))
	for i := range gray.Pix {
		gray.Pix[i] = byte(i * i)
	}
	if err := jpeg.Encode(&j, gray, nil); err != nil {
		t.Fatal(err)
	}
	if err := gif.Encode(&g, gray, nil); err != nil {
		t.Fatal(err)
	}
	p := pngOf(t, 7, 5)
	flipped := bytes.Clone(p)
	flipped[len(p)-20] ^= 1
	wide := bytes.Clone(p)
	copy(wide[16:], "\x00\x01\x00\x00\x00\x01\x00\x00")
	binary.BigEndian.PutUint32(wide[29:], crc32.ChecksumIEEE(wide[12:29]))
	garbled := bytes.Clone(g.Bytes())
	for i := len(garbled) / 2; i < len(garbled)-1; i++ {
		garbled[i] = 0x55
	}
	root := fstest.MapFS{}
	for name, data := range map[string][]byte{
		"garbled.gif": garbled,
		"a.png":       p, "b.jpg": j.Bytes(), "c.gif": g.Bytes(), "really.png": j.Bytes(), "sp ace.png": p,
		"cut.png": p[:len(p)-15], "cut.jpg": j.Bytes()[:j.Len()/2], "cut.gif": g.Bytes()[:g.Len()-3], "flipped.png": flipped, "wide.png": wide,
	} {
		root["img/"+name] = &fstest.MapFile{Data: data}
	}
	body := "![](img/a.png) ![](img/b.jpg) ![](img/c.gif) ![](img/really.png) ![](img/sp%20ace.png) ![](<img/sp ace.png>) ![](./img/../img/a.png?x#y)\n" +
		"![](img/cut.png) ![](img/cut.jpg) ![](img/cut.gif) ![](img/flipped.png) ![](img/wide.png) ![](img/garbled.gif)\n"
	root["a.md"] = &fstest.MapFile{Data: []byte(calc(body))}
	s := compile(root, "a.md")
	want := "5:5 missing-file `img/cut.png` is an image that was cut off or damaged\n" +
		"5:22 missing-file `img/cut.jpg` is an image that was cut off or damaged\n" +
		"5:39 missing-file `img/cut.gif` is an image that was cut off or damaged\n" +
		"5:56 missing-file `img/flipped.png` is an image that was cut off or damaged\n" +
		"5:77 bound-exceeded `img/wide.png` has 65536 × 65536 pixels, and an image may have 50 million at most\n" +
		"5:95 missing-file `img/garbled.gif` is an image that was cut off or damaged\n"
	if got := errorsOf(s); got != want {
		t.Errorf("got\n%swant\n%s", got, want)
	}
	if len(s.Images) != 5 || s.Images["img/really.png"].Format != "jpeg" || s.Images["img/sp ace.png"].Height != 5 {
		t.Errorf("%d images", len(s.Images))
	}
}

// On disk, nothing outside the root is read, links included, and names are
// shown as the user gave them.
func TestOpen(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("links need rights there")
	}
	dir := t.TempDir()
	write := func(name, text string) {
		t.Helper()
		if err := os.MkdirAll(filepath.Dir(filepath.Join(dir, name)), 0o755); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	link := func(to, name string) {
		t.Helper()
		if err := os.Symlink(to, filepath.Join(dir, name)); err != nil {
			t.Fatal(err)
		}
	}
	write("secret.md", calc("```calc\nx = 1\n```\n"))
	write("job/register.yaml", "firm: Works\n")
	write("job/loads.md", calc("```calc\nP = 48 kN\n```\n"))
	write("job/calcs/lug.md", "---\ncalc: C-1\nfrom: {ok: ../loads.md, up: ../../secret.md, link: link.md, inside: inside.md, chain: folder/secret.md}\n---\n")
	link(filepath.Join(dir, "secret.md"), "job/calcs/link.md")
	link("../loads.md", "job/calcs/inside.md")
	link(dir, "job/calcs/folder")
	link(filepath.Join(dir, "job/calcs/lug.md"), "named.md")
	t.Chdir(dir)

	s, err := Open("job/calcs/lug.md")
	if err != nil {
		t.Fatal(err)
	}
	want := "3:29 missing-file `../../secret.md` leaves the root folder, and no file outside it is read\n" +
		"3:52 missing-file `link.md`: it is a link that leads out of the root folder\n" +
		"3:87 missing-file `folder/secret.md`: it is a link that leads out of the root folder\n"
	if got := errorsOf(s); got != want {
		t.Errorf("got\n%swant\n%s", got, want)
	}
	if s.Source.Name != "job/calcs/lug.md" || s.Path != "calcs/lug.md" || s.Front.Firm != "Works" {
		t.Error(s.Source.Name, s.Path, s.Front.Firm)
	}
	if s, err := Open("named.md"); err != nil || s.Front.Firm != "Works" {
		t.Error("a link that the user names is followed to where the file lies", err)
	}
	// A register that is there and cannot be read is not passed over.
	write("elsewhere.yaml", "figures: 6\n")
	write("out/a.md", calc(""))
	link("../elsewhere.yaml", "out/register.yaml")
	if s, err := Open("out/a.md"); err != nil || !strings.HasSuffix(errorsOf(s), "register it is a link that leads out of the root folder\n") {
		t.Error(errorsOf(s), err)
	}
	if err := os.MkdirAll(filepath.Join(dir, "job/calcs/deep/register.yaml"), 0o755); err != nil {
		t.Fatal(err)
	}
	write("job/calcs/deep/b.md", calc(""))
	if s, err := Open("job/calcs/deep/b.md"); err != nil || s.Front.Firm != "Works" || s.Failed() {
		t.Error("a folder stands for a register", errorsOf(s), err)
	}
	t.Chdir(filepath.Join(dir, "job", "calcs"))
	if s, err := Open("lug.md"); err != nil || s.Source.Name != "lug.md" || s.Front.Firm != "Works" {
		t.Error(s.Source.Name, err)
	}
	write("job/calcs/locked.md", "")
	for name, words := range map[string]string{
		"none.md": "none.md: there is no such file", ".": ".: it is a folder", "lug.md/x": "lug.md/x: ", "": ": there is no such file",
	} {
		if s, err := Open(name); err == nil || s != nil || !strings.HasPrefix(err.Error(), words) {
			t.Errorf("%q: %v", name, err)
		}
	}
}

// A bug becomes a message that names the file, and tests see the panic.
func TestPanicIsReported(t *testing.T) {
	bomb := &Context{FS: panicking{}}
	s := Compile(bomb, "a.md")
	if len(s.Diagnostics) != 1 || s.Diagnostics[0].ID != diag.Internal || !strings.Contains(s.Diagnostics[0].Message, "a.md") {
		t.Error(report(s.Diagnostics))
	}
	bomb.Panics = true
	defer func() {
		if recover() == nil {
			t.Error("the panic did not come through")
		}
	}()
	Compile(bomb, "a.md")
}

type panicking struct{}

func (panicking) Open(string) (fs.File, error) { panic("a bug") }
