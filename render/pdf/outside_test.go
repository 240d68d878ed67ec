package pdf

import (
	"bytes"
	"flag"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/pdfcpu/pdfcpu/pkg/api"
	"github.com/pdfcpu/pdfcpu/pkg/pdfcpu"
	"github.com/pdfcpu/pdfcpu/pkg/pdfcpu/model"
)

var update = flag.Bool("update", false, "write the golden files")

func fixture(t testing.TB, name string) string {
	t.Helper()
	b, err := os.ReadFile(filepath.Join("testdata", name))
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

func written(t testing.TB, l *layout) []byte {
	t.Helper()
	b, err := l.write(fixedDate)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

func lug(t testing.TB) *layout { return newDocument(pageOf(t, fixture(t, "lug.md"), nil)).layout() }

// documents are what the programs of others look at.
func documents(t testing.TB) map[string][]byte {
	all := front + "\n"
	for _, c := range constructs {
		if !strings.Contains(c.markdown, "{P") {
			all += c.markdown + "\n\n<!-- -->\n\n"
		}
	}
	letter := strings.Replace(fixture(t, "lug.md"), "calc: C-104\n", "calc: C-104\npaper: Letter\n", 1)
	return map[string][]byte{
		"lug":        written(t, lug(t)),
		"letter":     written(t, newDocument(pageOf(t, letter, nil)).layout()),
		"images":     written(t, imagePage(t)),
		"constructs": written(t, newDocument(pageOf(t, all, map[string]string{"dot.png": dotPNG(t)})).layout()),
		"empty":      written(t, newDocument(pageOf(t, front, nil)).layout()),
	}
}

// tool runs a program on a PDF. Where it is not installed the test is skipped,
// but on the machine that checks every change.
func tool(t *testing.T, pdf []byte, name string, args ...string) string {
	t.Helper()
	if _, err := exec.LookPath(name); err != nil {
		if os.Getenv("CI") == "true" {
			t.Fatal(err)
		}
		t.Skip(err)
	}
	file := filepath.Join(t.TempDir(), "a.pdf")
	if err := os.WriteFile(file, pdf, 0o644); err != nil {
		t.Fatal(err)
	}
	for i, a := range args {
		if a == "FILE" {
			args[i] = file
		}
	}
	out, err := exec.Command(name, args...).CombinedOutput()
	if err != nil {
		t.Fatalf("%s: %v\n%s", name, err, out)
	}
	return string(out)
}

func TestQPDF(t *testing.T) {
	for name, pdf := range documents(t) {
		t.Run(name, func(t *testing.T) {
			out := tool(t, pdf, "qpdf", "--check", "FILE")
			if !strings.Contains(out, "No syntax or stream encoding errors found") || strings.Contains(out, "WARNING") {
				t.Error(out)
			}
		})
	}
}

func TestEveryFaceIsEmbedded(t *testing.T) {
	for name, pdf := range documents(t) {
		t.Run(name, func(t *testing.T) {
			lines := strings.Split(strings.TrimSpace(tool(t, pdf, "pdffonts", "FILE")), "\n")[2:]
			for _, l := range lines {
				// name, type in two words, encoding, embedded, cut down, with Unicode
				f := strings.Fields(l)
				if len(f) < 7 || f[4] != "yes" || f[6] != "yes" {
					t.Errorf("not embedded, or not to be searched: %s", l)
				}
			}
			if len(lines) < 2 {
				t.Errorf("%d faces", len(lines))
			}
		})
	}
}

// The text of the sheet as a reader finds it, by columns.
func TestText(t *testing.T) {
	got := tool(t, written(t, lug(t)), "pdftotext", "-layout", "FILE", "-")
	golden := filepath.Join("testdata", "lug.txt")
	if *update {
		if err := os.WriteFile(golden, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	if diff := cmp.Diff(fixture(t, "lug.txt"), got); diff != "" {
		t.Error(diff)
	}
}

// In the order of the file a line is read from its reference to its output.
func TestReadingOrder(t *testing.T) {
	got := tool(t, written(t, lug(t)), "pdftotext", "-raw", "FILE", "-")
	for _, want := range []string{
		"load schedule, row 7 P = 48 kN Pull on one lug, factored",
		"(2.2) Average shear stress, two planes τ = P 2 A = 48 kN 2 · 490.9 mm² 48.89 MPa",
		"the shear strain of the pin is 6.036 × 10",
		"(2.4) Pin in double shear τ = 48.89 MPa ≤ τd = 136.6 MPa 0.36 OK",
	} {
		if !strings.Contains(strings.Join(strings.Fields(got), " "), want) {
			t.Errorf("not found: %s\nin\n%s", want, got)
		}
	}
}

func readBack(t testing.TB) *model.Configuration {
	t.Helper()
	api.DisableConfigDir()
	return model.NewDefaultConfiguration()
}

func TestBookmarks(t *testing.T) {
	got, err := api.Bookmarks(bytes.NewReader(written(t, lug(t))), readBack(t))
	if err != nil {
		t.Fatal(err)
	}
	want := strings.Join([]string{
		"1 Summary p1", "2 Pin in double shear p1", "  2.1 Plate p2", "3 Bolts p3",
		"Summary of checks p4", "Givens without a source p4", "Assumptions p4", "Holds p4", "Symbols p4", "Sources p5", "Notes p5", "",
	}, "\n")
	if diff := cmp.Diff(want, outline(got, "")); diff != "" {
		t.Error(diff)
	}
}

func outline(list []pdfcpu.Bookmark, indent string) string {
	s := ""
	for _, b := range list {
		s += indent + b.Title + " p" + string(rune('0'+b.PageFrom)) + "\n" + outline(b.Kids, indent+"  ")
	}
	return s
}

// Headings whose levels jump still make an outline that can be read.
func TestBookmarksThatJump(t *testing.T) {
	p := pageOf(t, front+"\n# a\n\n#### τ 😀\n\n## c\n\n###### d\n\n# e\n", nil)
	got, err := api.Bookmarks(bytes.NewReader(written(t, newDocument(p).layout())), readBack(t))
	if err != nil {
		t.Fatal(err)
	}
	text := outline(got, "")
	for _, want := range []string{"a p1\n", "τ U+1F600 p1\n", "c p1\n", "d p1\n", "e p1\n"} {
		if !strings.Contains(text, want) {
			t.Errorf("%q is not in the outline:\n%s", want, text)
		}
	}
}

func TestLinks(t *testing.T) {
	pdf := written(t, lug(t))
	pages, err := api.Annotations(bytes.NewReader(pdf), nil, readBack(t))
	if err != nil {
		t.Fatal(err)
	}
	inside, outside := 0, []string{}
	for _, p := range pages {
		for _, a := range p[model.AnnLink].Map {
			switch a := a.(type) {
			case model.LinkAnnotation:
				if a.URI != "" {
					outside = append(outside, a.URI)
				} else {
					inside++
				}
			}
		}
	}
	if len(outside) != 1 || outside[0] != "https://example.com/basis" {
		t.Errorf("links to the outside: %q", outside)
	}
	if inside < 60 {
		t.Errorf("%d links within the document; symbols and the summary have more", inside)
	}
	// Each leads to a page that is there.
	if n := bytes.Count(pdf, []byte("/Dest [1 0 R")); n > 0 {
		t.Errorf("%d links lead to no page", n)
	}
}

func TestProperties(t *testing.T) {
	info, err := api.PDFInfo(bytes.NewReader(written(t, lug(t))), "a.pdf", nil, false, readBack(t))
	if err != nil {
		t.Fatal(err)
	}
	const length = len("D:20060102150405")
	got := []string{info.Title, info.Author, info.Subject, info.CreationDate[:length], info.ModificationDate[:length]}
	want := []string{"C-104 rev B Lifting lug LL-2: pin and plates", "KT", "Footbridge lift, temporary works", "D:20260302000000", "D:20260302000000"}
	if diff := cmp.Diff(want, got); diff != "" {
		t.Error(diff)
	}
}
