package pdf

import (
	"bytes"
	"strconv"
	"strings"

	"github.com/go-pdf/fpdf"

	"gusset/render/fonts"
	"gusset/render/maths"
)

// canvas draws on the pages of one PDF. It keeps what is set in the file, so
// that a face, a size or a colour is written only when it changes: the library
// formats each of them anew.
type canvas struct {
	pdf    *fpdf.Fpdf
	face   *fonts.Face
	size   float64
	colour colour
	family map[*fonts.Face]string
	path   []byte
}

// noColour is none that a page has.
const noColour colour = 1 << 24

func newCanvas(p paper) *canvas {
	c := &canvas{
		pdf:    fpdf.New("P", "pt", p.name, ""),
		family: map[*fonts.Face]string{},
		colour: noColour,
	}
	c.pdf.SetMargins(0, 0, 0)
	c.pdf.SetAutoPageBreak(false, 0)
	c.pdf.SetCatalogSort(true)
	return c
}

// draw draws ink at a place of the page. Fills come first.
func (c *canvas) draw(k *ink, x, y float64) {
	for _, f := range k.fills {
		c.fill(x+f.x, y+f.y, f.w, f.h, f.colour)
	}
	for i := range k.pictures {
		p := &k.pictures[i]
		c.picture(p, x+p.x, y+p.y)
	}
	for i := range k.shapes {
		s := &k.shapes[i]
		c.shape(s, x+s.x, y+s.y)
	}
	for i := range k.texts {
		t := &k.texts[i]
		c.text(t, x+t.x, y+t.y)
	}
}

func (c *canvas) fill(x, y, w, h float64, to colour) {
	c.use(to)
	c.pdf.Rect(x, y, w, h, "F")
}

// use sets one colour for fills and text alike: while they are the same the
// library writes text without saving and restoring the state around it.
func (c *canvas) use(to colour) {
	if c.colour != to {
		r, g, b := int(to>>16), int(to>>8&0xFF), int(to&0xFF)
		c.pdf.SetFillColor(r, g, b)
		c.pdf.SetTextColor(r, g, b)
		c.colour = to
	}
}

func (c *canvas) text(t *text, x, y float64) {
	c.use(t.colour)
	if c.face != t.face || c.size != t.size {
		c.pdf.SetFont(c.familyOf(t.face), "", t.size)
		c.face, c.size = t.face, t.size
	}
	if t.tracked != 0 {
		c.pdf.RawWriteStr(strconv.FormatFloat(t.tracked, 'f', 2, 64) + " Tc")
	}
	c.pdf.Text(x, y, t.text)
	if t.tracked != 0 {
		c.pdf.RawWriteStr("0 Tc")
	}
}

// familyOf returns the name that the library knows a face by, and hands the
// face over at its first use: each costs the library milliseconds.
func (c *canvas) familyOf(face *fonts.Face) string {
	name, ok := c.family[face]
	if !ok {
		name = faceFamily(face)
		// The library writes into the bytes of a face whose last glyphs share
		// their widths, and the bytes are everyone's.
		c.pdf.AddUTF8FontFromBytes(name, "", bytes.Clone(face.TTF))
		c.family[face] = name
	}
	return name
}

func faceFamily(face *fonts.Face) string {
	name := strings.ReplaceAll(face.Name, " ", "")
	if face.Weight == 600 {
		name += "-SemiBold"
	}
	if face.Italic {
		name += "-Italic"
	}
	return name
}

func (c *canvas) picture(p *picture, x, y float64) {
	c.pdf.ImageOptions(p.image.name, x, y, p.w, p.h, false, fpdf.ImageOptions{AllowNegativePosition: true}, 0, "")
}

// shape fills an outline. Fonts have quadratic curves and PDF cubic ones.
func (c *canvas) shape(s *shape, x, y float64) {
	c.use(s.colour)
	_, height := c.pdf.GetPageSize()
	y = height - y
	b := c.path[:0]
	var atX, atY float64
	started := false
	for _, g := range s.path {
		toX, toY := x+g.P.X*s.scale, y+g.P.Y*s.scale
		switch g.Kind {
		case maths.Move:
			if started {
				b = append(b, "h\n"...)
			}
			started = true
			b = append(appendPoint(b, toX, toY), "m\n"...)
		case maths.Line:
			b = append(appendPoint(b, toX, toY), "l\n"...)
		case maths.Curve:
			cx, cy := x+g.C.X*s.scale, y+g.C.Y*s.scale
			b = appendPoint(b, atX+(cx-atX)*2/3, atY+(cy-atY)*2/3)
			b = appendPoint(b, toX+(cx-toX)*2/3, toY+(cy-toY)*2/3)
			b = append(appendPoint(b, toX, toY), "c\n"...)
		}
		atX, atY = toX, toY
	}
	b = append(b, "h f"...)
	c.path = b
	c.pdf.RawWriteBuf(bytes.NewReader(b))
}

func appendPoint(b []byte, x, y float64) []byte {
	b = strconv.AppendFloat(b, x, 'f', 3, 64)
	b = append(b, ' ')
	b = strconv.AppendFloat(b, y, 'f', 3, 64)
	return append(b, ' ')
}
