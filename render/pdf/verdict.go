package pdf

import (
	"math"

	"gusset/render"
	"gusset/render/fonts"
)

// The measures of a verdict and its bar.
const (
	verdictSize = 10.0
	barHeight   = 4.2
	barDrop     = 4.5 // from the verdict's baseline to the bar
	tickWidth   = 1.4
	tickOver    = 2.0 // how far the tick looks out above and below the bar
)

// verdictBeside sets a check's verdict in the output column, half-way down the
// parts of its entry.
func (b *prose) verdictBeside(parts []slab, e *render.Entry) {
	v := e.Verdict
	if v == nil {
		return
	}
	var s slab
	low := b.doc.verdict(&s, v, verdictSize*0.72)
	if e.Mark != "" {
		low = b.doc.smallOutput(&s, e.Mark, low+9.5) + 1.5
	}
	whole := height(parts)
	last := &parts[len(parts)-1]
	if lack := low + 2*bandPad - whole; lack > 0 {
		last.height += lack
		whole += lack
	}
	y := (whole-low)/2 - (whole - last.height) - last.pad
	if whole > b.doc.tallest() {
		// The parts may stand on several pages.
		y = 0
	}
	last.ink.add(&s.ink, 0, y)
}

// verdict sets the utilisation and the word for it on a baseline, and the bar
// below; it returns the lower edge. The colours repeat what the word says.
func (d *document) verdict(s *slab, v *render.Verdict, y float64) float64 {
	x, width := d.paper.output()
	c := okColour
	switch {
	case !v.Required:
		c = softColour
	case !v.OK:
		c = ngColour
	}
	word := style{face: fonts.SansSemiBold, size: verdictSize, colour: c}
	figures := word
	if v.OK {
		figures.colour = inkColour
	}
	if !v.Required {
		word.size = 8.2
	}
	at := x + width - word.width(v.Word)
	if v.Utilisation == "" {
		at = x
	} else if figures.width(v.Utilisation)+6 > at-x {
		s.ink.texts = append(s.ink.texts, text{x: x, y: y, style: figures, text: v.Utilisation})
		y += outputLeading
		at = x
	} else {
		s.ink.texts = append(s.ink.texts, text{x: x, y: y, style: figures, text: v.Utilisation})
	}
	s.ink.texts = append(s.ink.texts, text{x: at, y: y, style: word, text: v.Word})
	fill, beyond, ok := v.Bar()
	if !ok {
		return y + 2
	}
	d.bar(s, x, y+barDrop, width, fill, beyond, c)
	return y + barDrop + barHeight + tickOver
}

// bar draws a bar, its tick at 1.0, and two cuts near the end where the ratio goes
// beyond its end.
func (d *document) bar(s *slab, x, y, width, fill float64, beyond bool, c colour) {
	s.ink.fill(x, y, width, barHeight, restColour)
	if fill > 0 {
		s.ink.fill(x, y, math.Max(width*fill, 0.6), barHeight, c)
	}
	if beyond {
		// Two cuts near the end say that the bar is not to scale there.
		for _, at := range []float64{0.90, 0.94} {
			s.ink.fill(x+width*at, y, 1, barHeight, washColour)
		}
	}
	s.ink.fill(x+width*render.BarTick-tickWidth/2, y-tickOver, tickWidth, barHeight+2*tickOver, inkColour)
}
