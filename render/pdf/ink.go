package pdf

import (
	"gusset/render/fonts"
	"gusset/render/maths"
)

// colour is a colour of the page as 0xRRGGBB.
type colour uint32

// The colours of a sheet. Each keeps its meaning in black and white: what
// they say is said in words as well.
const (
	inkColour  colour = 0x16202C // text and rules
	softColour colour = 0x5B6876 // notes, labels, numbers
	markColour colour = 0x0D5C75 // sources, links
	hairColour colour = 0xCFD6DD // column rules
	washColour colour = 0xF3F6F8 // the band behind a check, code
	restColour colour = 0xDDE4EA // the unused length of a bar
	okColour   colour = 0x2E6B45
	ngColour   colour = 0xB3261E
)

// style is how a stretch of text is set. Link is where it leads: an anchor
// behind #, an address, or nowhere.
type style struct {
	face   *fonts.Face
	size   float64
	colour colour
	link   string
}

func (s style) in(face *fonts.Face) style { s.face = face; return s }

func (s style) width(text string) float64 {
	return float64(s.face.Width(text)) * s.size / 1000
}

// ink is what is drawn at some place of a page. Lengths are points, x to the
// right and y down from the place; a text's y is its baseline. Fills lie
// under everything else.
type ink struct {
	fills    []fill
	pictures []picture
	texts    []text
	drawings []drawing
	areas    []area
}

type fill struct {
	x, y, w, h float64
	colour     colour
}

// text is a text in one style, or a formula that the maths set: its items, from
// the left end of the baseline, all lengths times the scale.
type text struct {
	x, y float64
	style
	text    string
	tracked float64 // space put behind each letter
	items   []maths.Item
	scale   float64
}

type picture struct {
	x, y, w, h float64
	image      *image
}

// area is a place that can be clicked.
type area struct {
	x, y, w, h float64
	link       string
}

func (k *ink) fill(x, y, w, h float64, c colour) {
	k.fills = append(k.fills, fill{x, y, w, h, c})
}

// add puts the ink of o at a place of k.
func (k *ink) add(o *ink, x, y float64) {
	for _, f := range o.fills {
		f.x, f.y = f.x+x, f.y+y
		k.fills = append(k.fills, f)
	}
	for _, p := range o.pictures {
		p.x, p.y = p.x+x, p.y+y
		k.pictures = append(k.pictures, p)
	}
	for _, t := range o.texts {
		t.x, t.y = t.x+x, t.y+y
		k.texts = append(k.texts, t)
	}
	for _, a := range o.areas {
		a.x, a.y = a.x+x, a.y+y
		k.areas = append(k.areas, a)
	}
}

// box is ink with its extent about a baseline.
type box struct {
	width, ascent, descent float64
	ink                    ink // from the left end of the baseline
}

// scaled is a box set smaller.
func (b *box) scaled(k float64) *box {
	out := &box{width: b.width * k, ascent: b.ascent * k, descent: b.descent * k}
	for _, f := range b.ink.fills {
		out.ink.fill(f.x*k, f.y*k, f.w*k, f.h*k, f.colour)
	}
	for _, p := range b.ink.pictures {
		out.ink.pictures = append(out.ink.pictures, picture{p.x * k, p.y * k, p.w * k, p.h * k, p.image})
	}
	for _, t := range b.ink.texts {
		t.x, t.y, t.size, t.tracked, t.scale = t.x*k, t.y*k, t.size*k, t.tracked*k, t.scale*k
		out.ink.texts = append(out.ink.texts, t)
	}
	return out
}
