package pdf

import (
	"bytes"
	"math"
	"strconv"

	"gusset/render/figure"
)

// drawing is a plot or a figure, all its lengths times the scale.
type drawing struct {
	x, y, scale float64
	art         *figure.Drawing
}

// drawing pushes a drawing, made smaller where the column or the page has no
// room for it.
func (r *row) drawing(art *figure.Drawing, tallest float64) {
	if art == nil {
		return
	}
	k := math.Min(1, math.Min(r.width/art.Width, tallest/art.Height))
	s := slab{height: k * art.Height, baseline: 0.72 * noteVoice.leading}
	s.ink.drawings = append(s.ink.drawings, drawing{x: r.x, scale: k, art: art})
	r.push(s)
	r.keep()
}

// drawing draws the items of a drawing in their order.
func (c *canvas) drawing(d *drawing, x, y float64) {
	x, y = x+d.x, y+d.y
	for i := range d.art.Items {
		item := &d.art.Items[i]
		if item.Path != nil {
			c.trace(item, x, y, d.scale)
			continue
		}
		for _, r := range item.Text {
			t := text{text: r.Text, style: style{face: r.Face, size: r.Size * d.scale, colour: colour(item.Colour)}}
			c.text(&t, x+d.scale*r.X, y+d.scale*r.Y)
		}
	}
}

// trace fills or strokes a path, the state of the page saved around a stroke.
func (c *canvas) trace(item *figure.Item, x, y, scale float64) {
	_, height := c.pdf.GetPageSize()
	b := c.path[:0]
	if item.Stroke == 0 {
		c.use(colour(item.Colour))
	} else {
		b = append(b, "q "...)
		for shift := 16; shift >= 0; shift -= 8 {
			b = strconv.AppendFloat(b, float64(item.Colour>>shift&0xFF)/255, 'f', 3, 64)
			b = append(b, ' ')
		}
		b = append(b, "RG "...)
		b = strconv.AppendFloat(b, item.Stroke*scale, 'f', 3, 64)
		b = append(b, " w 0 J 0 j 4 M ["...)
		for _, l := range item.Dash {
			b = strconv.AppendFloat(b, l*scale, 'f', 3, 64)
			b = append(b, ' ')
		}
		b = append(b, "] 0 d\n"...)
	}
	point := func(p figure.Point) { b = appendPoint(b, x+scale*p.X, height-y-scale*p.Y) }
	for _, s := range item.Path {
		switch s.Kind {
		case figure.Move:
			point(s.P)
			b = append(b, "m\n"...)
		case figure.Line:
			point(s.P)
			b = append(b, "l\n"...)
		case figure.Curve:
			point(s.C1)
			point(s.C2)
			point(s.P)
			b = append(b, "c\n"...)
		case figure.Close:
			b = append(b, "h\n"...)
		}
	}
	if item.Stroke == 0 {
		b = append(b, 'f')
	} else {
		b = append(b, "S Q"...)
	}
	c.path = b
	c.pdf.RawWriteBuf(bytes.NewReader(b))
}
