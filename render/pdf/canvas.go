package pdf

import (
	"bytes"
	"strconv"
	"strings"
	"sync"

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
	c.pdf.SetCompression(false) // see squeeze
	return c
}

// draw draws ink at a place of the page, what lies under the rest first.
func (c *canvas) draw(k *ink, x, y float64) {
	for _, f := range k.fills {
		c.fill(x+f.x, y+f.y, f.w, f.h, f.colour)
	}
	for i := range k.pictures {
		p := &k.pictures[i]
		c.picture(p, x+p.x, y+p.y)
	}
	for i := range k.drawings {
		c.drawing(&k.drawings[i], x, y)
	}
	for i := range k.texts {
		if t := &k.texts[i]; t.items != nil {
			c.formula(t, x+t.x, y+t.y)
		} else {
			c.text(t, x+t.x, y+t.y)
		}
	}
}

func (c *canvas) formula(m *text, x, y float64) {
	for i := range m.items {
		item := &m.items[i]
		atX, atY := x+item.X*m.scale, y+item.Y*m.scale
		switch item.Kind {
		case maths.Rule:
			c.fill(atX, atY, item.Width*m.scale, item.Height*m.scale, m.colour)
		case maths.Outline:
			c.use(m.colour)
			c.outline(item.Path, atX, atY, item.Size*m.scale/1000)
		default:
			c.use(m.colour)
			c.setFont(item.Face, item.Size*m.scale)
			c.show(item.Face, item.Size*m.scale, atX, atY, item.Text)
		}
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
	c.setFont(t.face, t.size)
	if t.tracked != 0 {
		c.pdf.RawWriteStr(strconv.FormatFloat(t.tracked, 'f', 2, 64) + " Tc")
	}
	c.show(t.face, t.size, x, y, t.text)
	if t.tracked != 0 {
		c.pdf.RawWriteStr("0 Tc")
	}
}

// show draws a text in the face and the size that are set.
func (c *canvas) show(face *fonts.Face, size, x, y float64, text string) {
	face.Stretches(text, func(s fonts.Stretch) {
		c.pdf.Text(x+float64(s.X)*size/1000, y-float64(s.Y)*size/1000, s.Text)
	})
}

func (c *canvas) setFont(face *fonts.Face, size float64) {
	if c.face != face || c.size != size {
		c.pdf.SetFont(c.familyOf(face), "", size)
		c.face, c.size = face, size
	}
}

// familyOf returns the name that the library knows a face by, and hands the
// face over at its first use: each costs the library milliseconds.
func (c *canvas) familyOf(face *fonts.Face) string {
	name, ok := c.family[face]
	if !ok {
		name = faceFamily(face)
		c.pdf.AddUTF8FontFromBytes(name, "", face.TTF)
		c.family[face] = name
	}
	return name
}

// expected hands faces over to the library while the page is laid out, which
// takes about as long. Only one of the two touches the canvas at a time.
type expected struct {
	faces chan *fonts.Face
	seen  map[*fonts.Face]bool
	done  sync.WaitGroup
}

func (c *canvas) expect() *expected {
	e := &expected{faces: make(chan *fonts.Face, len(fonts.Faces())), seen: map[*fonts.Face]bool{}}
	e.done.Go(func() {
		for face := range e.faces {
			c.familyOf(face)
		}
	})
	return e
}

// in tells of the faces in some ink that will be drawn.
func (e *expected) in(k *ink) {
	for i := range k.texts {
		t := &k.texts[i]
		if t.items == nil {
			e.tell(t.face)
		}
		for j := range t.items {
			if t.items[j].Kind == maths.Run {
				e.tell(t.items[j].Face)
			}
		}
	}
}

func (e *expected) tell(face *fonts.Face) {
	if !e.seen[face] {
		e.seen[face] = true
		e.faces <- face
	}
}

// wait ends it, when all that was told of is handed over.
func (e *expected) wait() {
	close(e.faces)
	e.done.Wait()
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

// outline fills a path from a font, whose y points up. Fonts have quadratic
// curves and PDF cubic ones.
func (c *canvas) outline(path []maths.Segment, x, y, scale float64) {
	_, height := c.pdf.GetPageSize()
	y = height - y
	b := c.path[:0]
	var atX, atY float64
	started := false
	for _, g := range path {
		toX, toY := x+g.P.X*scale, y+g.P.Y*scale
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
			cx, cy := x+g.C.X*scale, y+g.C.Y*scale
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
