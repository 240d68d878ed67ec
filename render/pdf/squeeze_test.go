package pdf

import (
	"bytes"
	"strings"
	"testing"
)

func TestSqueeze(t *testing.T) {
	l := lug(t)
	c := newCanvas(l.paper)
	c.pdf.SetCreationDate(fixedDate)
	c.pdf.SetModificationDate(fixedDate)
	for i := range l.pages {
		c.pdf.AddPage()
		l.furniture(c, i)
	}
	var plain bytes.Buffer
	if err := c.pdf.Output(&plain); err != nil {
		t.Fatal(err)
	}
	packed, err := squeeze(plain.Bytes())
	if err != nil {
		t.Fatal(err)
	}
	if n := bytes.Count(packed, []byte("<</Filter /FlateDecode /Length")); n < len(l.pages) {
		t.Errorf("%d streams are compressed, and there are %d pages", n, len(l.pages))
	}
	want, got := tool(t, plain.Bytes(), "qpdf", "--qdf", "--static-id", "FILE", "-"), tool(t, packed, "qpdf", "--qdf", "--static-id", "FILE", "-")
	if want != got {
		t.Error("the squeezed file holds other objects")
	}
}

// What is no file of the library's is an error, not a panic.
func TestSqueezeRefuses(t *testing.T) {
	for _, s := range []string{
		"", "startxref\n", "startxref\n9\n%%EOF\n", "xref\n0 3\nstartxref\n0\n%%EOF\n",
		"xref\n0 2\n0000000000 65535 f \n9999999999 00000 n \nstartxref\n0\n%%EOF\n", strings.Repeat("startxref\n0\n", 9),
	} {
		if _, err := squeeze([]byte(s)); err == nil {
			t.Errorf("%q is taken", s)
		}
	}
}
