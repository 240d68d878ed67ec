package pdf

import (
	"bytes"
	goimage "image"
	"image/color"
	"image/color/palette"
	"image/draw"
	"image/gif"
	"image/jpeg"
	"image/png"
	"strings"
	"testing"

	"github.com/yuin/goldmark/ast"

	"gusset/notebook"
)

func dot(m draw.Image) draw.Image {
	b := m.Bounds()
	for y := b.Min.Y; y < b.Max.Y; y++ {
		for x := b.Min.X; x < b.Max.X; x++ {
			m.Set(x, y, color.NRGBA{uint8(20 * x), uint8(30 * y), 90, uint8(255 - 10*x)})
		}
	}
	return m
}

func encodedPNG(t testing.TB, m goimage.Image) string {
	var b bytes.Buffer
	if err := png.Encode(&b, m); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func dotPNG(t testing.TB) string {
	return encodedPNG(t, dot(goimage.NewRGBA(goimage.Rect(0, 0, 12, 8))))
}

// imageFiles are images of all kinds that a calc may show, all of one width.
func imageFiles(t testing.TB) map[string]string {
	size := goimage.Rect(0, 0, 12, 8)
	var j, grey, g bytes.Buffer
	if err := jpeg.Encode(&j, dot(goimage.NewRGBA(size)), nil); err != nil {
		t.Fatal(err)
	}
	if err := jpeg.Encode(&grey, dot(goimage.NewGray(size)), nil); err != nil {
		t.Fatal(err)
	}
	if err := gif.Encode(&g, dot(goimage.NewRGBA(size)), nil); err != nil {
		t.Fatal(err)
	}
	opaque := goimage.NewNRGBA(size)
	draw.Draw(opaque, size, goimage.NewUniform(color.NRGBA{1, 2, 3, 255}), goimage.Point{}, draw.Src)
	return map[string]string{
		"rgba.png": dotPNG(t), "deep.png": encodedPNG(t, dot(goimage.NewNRGBA64(size))),
		"grey.png":    encodedPNG(t, dot(goimage.NewGray(size))),
		"palette.png": encodedPNG(t, dot(goimage.NewPaletted(size, palette.Plan9))),
		"clear.png":   encodedPNG(t, dot(goimage.NewPaletted(size, color.Palette{color.NRGBA{0, 0, 0, 0}, color.NRGBA{9, 9, 9, 128}, color.White}))),
		"opaque.png":  encodedPNG(t, opaque),
		"colour.jpg":  j.String(), "grey.jpg": grey.String(), "dot.gif": g.String(),
	}
}

func imagePage(t testing.TB) *layout {
	files := imageFiles(t)
	var b strings.Builder
	b.WriteString(strings.Replace(front, "rev: B", "logo: rgba.png", 1))
	for _, name := range []string{"rgba.png", "deep.png", "grey.png", "palette.png", "clear.png", "opaque.png", "colour.jpg", "grey.jpg", "dot.gif", "rgba.png"} {
		b.WriteString("\n![" + name + "](" + name + ")\n")
	}
	return newDocument(pageOf(t, b.String(), files)).layout()
}

func TestImages(t *testing.T) {
	l := imagePage(t)
	if n := len(l.album.order); n != 9 {
		t.Errorf("the file holds %d images, want each of 9 once", n)
	}
	seen := 0
	for _, page := range l.pages {
		for i := range page {
			seen += len(page[i].ink.pictures)
		}
	}
	if seen != 10 {
		t.Errorf("%d pictures are printed, want 10", seen)
	}
	inFrame(t, l)
	if _, err := l.write(fixedDate); err != nil {
		t.Fatal(err)
	}
}

// The words under an image have the values that are named in them.
func TestImageWords(t *testing.T) {
	text := front + "\n```calc\nw = 320 mm # Width [drawing S-11]\n```\n\n![Plate, {w} *wide*](rgba.png)\n"
	d := newDocument(pageOf(t, text, imageFiles(t)))
	found := false
	_ = ast.Walk(d.page.Sheet.Doc, func(n ast.Node, entering bool) (ast.WalkStatus, error) {
		if im, ok := n.(*ast.Image); ok && entering {
			found = true
			if got, want := d.imageWords(im), "Plate, 320 mm wide"; got != want {
				t.Errorf("got %q, want %q", got, want)
			}
		}
		return ast.WalkContinue, nil
	})
	if !found {
		t.Error("there is no image")
	}
}

// The library sorts images by width only, so the order of several of one width
// is the test.
func TestImagesOfOneWidthKeepTheirOrder(t *testing.T) {
	first, err := imagePage(t).write(fixedDate)
	if err != nil {
		t.Fatal(err)
	}
	for range 12 {
		again, err := imagePage(t).write(fixedDate)
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(first, again) {
			t.Fatal("the same page gave other bytes")
		}
	}
}

func TestFit(t *testing.T) {
	tests := []struct {
		name             string
		w, h             int
		room, most       float64
		wantWide, wantHi float64
	}{
		{"its own size", 100, 50, 334, 500, 75, 37.5},
		{"as wide as the column", 1000, 500, 300, 500, 300, 150},
		{"no taller than may be", 100, 1000, 300, 500, 50, 500},
		{"both", 1000, 4000, 300, 500, 125, 500},
	}
	for _, tt := range tests {
		w, h := (&image{width: tt.w, height: tt.h}).fit(tt.room, tt.most)
		if w != tt.wantWide || h != tt.wantHi {
			t.Errorf("%s: got %.1f × %.1f, want %.1f × %.1f", tt.name, w, h, tt.wantWide, tt.wantHi)
		}
	}
}

// An image that is none leaves its words.
func TestNoImage(t *testing.T) {
	if im := embeddable(&notebook.Image{Format: "png", Width: 3, Height: 3, Data: []byte("no image")}); im != nil {
		t.Errorf("got an image of %d × %d", im.width, im.height)
	}
}
