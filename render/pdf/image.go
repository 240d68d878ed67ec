package pdf

import (
	"bytes"
	"encoding/gob"
	"image/color"
	"image/draw"
	_ "image/gif" // decoders of the images that a page may show
	_ "image/jpeg"
	"image/png"
	"strconv"

	goimage "image"

	"github.com/go-pdf/fpdf"

	"gusset/notebook"
)

// image is a picture as the PDF embeds it.
type image struct {
	name          string
	kind          string // "jpeg" or "png"
	data          []byte
	width, height int // in pixels
}

// album holds the images of a document by path, nil for one that cannot be
// shown, and in the order of their first use.
type album struct {
	files map[string]*notebook.Image
	ready map[string]*image
	order []*image
}

// image returns the image of a path within the root, and nil where there is
// none that can be shown.
func (a *album) image(path string) *image {
	im, ok := a.ready[path]
	if ok {
		return im
	}
	if file := a.files[path]; file != nil {
		im = embeddable(file)
	}
	a.ready[path] = im
	if im != nil {
		im.name = "image" + strconv.Itoa(len(a.order))
		a.order = append(a.order, im)
	}
	return im
}

// embeddable returns an image as it goes into the file. A JPEG in grey or
// colour and the plainest kind of PNG go in as they are; all else is decoded
// and written anew, since the library reads no interlaced PNG, loses what is
// half transparent in a palette, and takes deep ones wrongly.
func embeddable(file *notebook.Image) *image {
	out := &image{width: file.Width, height: file.Height}
	if asItIs(file) {
		out.kind, out.data = file.Format, file.Data
		return out
	}
	m, _, err := goimage.Decode(bytes.NewReader(file.Data))
	if err != nil || m.Bounds().Empty() {
		return nil
	}
	size := m.Bounds()
	out.width, out.height = size.Dx(), size.Dy()
	flat := goimage.NewNRGBA(goimage.Rect(0, 0, size.Dx(), size.Dy()))
	draw.Draw(flat, flat.Bounds(), m, size.Min, draw.Src)
	var b bytes.Buffer
	if png.Encode(&b, flat) != nil {
		return nil
	}
	out.kind, out.data = "png", b.Bytes()
	return out
}

func asItIs(file *notebook.Image) bool {
	switch file.Format {
	case "jpeg":
		config, _, err := goimage.DecodeConfig(bytes.NewReader(file.Data))
		return err == nil && (config.ColorModel == color.GrayModel || config.ColorModel == color.YCbCrModel)
	case "png":
		// Bit depth, colour type and interlacing stand at fixed places.
		const depth, kind, interlaced = 24, 25, 28
		d := file.Data
		return len(d) > interlaced && d[depth] == 8 && (d[kind] == 0 || d[kind] == 2) && d[interlaced] == 0 &&
			!bytes.Contains(d, []byte("tRNS"))
	}
	return false
}

// fit is the size that an image is printed at: its own at 96 pixels to the
// inch, or less where it would be wider or taller than there is room.
func (m *image) fit(width, height float64) (w, h float64) {
	w, h = float64(m.width)*0.75, float64(m.height)*0.75
	if w > width {
		w, h = width, h*width/w
	}
	if h > height {
		w, h = w*height/h, height
	}
	return w, h
}

// register hands the images to the library. It sorts them by their widths
// alone, so that two of one width would come in any order; a part of a pixel
// more for each further one settles it, and is cut off where it is written.
func (a *album) register(pdf *fpdf.Fpdf) {
	same := map[int]int{}
	for _, im := range a.order {
		info := pdf.RegisterImageOptionsReader(im.name, fpdf.ImageOptions{ImageType: im.kind}, bytes.NewReader(im.data))
		if n := same[im.width]; info != nil && n > 0 {
			pdf.SetError(widen(info, float64(n)/float64(len(a.order))))
		}
		same[im.width]++
	}
}

// widen adds to the width of an image that the library has read. It can be
// reached only in the stored form of an image.
func widen(info *fpdf.ImageInfoType, by float64) error {
	stored, err := info.GobEncode()
	if err != nil {
		return err
	}
	width := new(float64)
	fields := []any{
		new([]byte), new([]byte), new(int), width, new(float64), new(string),
		new([]byte), new(int), new(string), new(string), new([]int), new(float64), new(float64),
	}
	var changed bytes.Buffer
	from, to := gob.NewDecoder(bytes.NewReader(stored)), gob.NewEncoder(&changed)
	for _, field := range fields {
		if err := from.Decode(field); err != nil {
			return err
		}
		if field == any(width) {
			*width += by
		}
		if err := to.Encode(field); err != nil {
			return err
		}
	}
	return info.GobDecode(changed.Bytes())
}
