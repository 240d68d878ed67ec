package maths

import (
	"sync"

	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"

	"gusset/render/fonts"
)

// growing are the characters that are drawn taller than the face's letters.
const growing = "()[]{}|‖⌈⌉⌊⌋√"

// outlines holds the outlines of all that growing grows to. They are read once
// and not for each glyph, since a set of formulas uses most of them.
var outlines = sync.OnceValue(func() map[uint16][]Segment {
	face, err := sfnt.Parse(fonts.Math.TTF)
	if err != nil {
		panic(err) // an embedded file
	}
	all := map[uint16][]Segment{}
	var buf sfnt.Buffer
	for _, r := range growing {
		growth := fonts.MathMetrics().Growth(fonts.Math.Glyph(r))
		for _, v := range growth.Variants {
			all[v.Glyph] = outline(face, &buf, v.Glyph)
		}
		for _, p := range growth.Parts {
			all[p.Glyph] = outline(face, &buf, p.Glyph)
		}
	}
	return all
})

// outline reads a glyph. The em is 1,000 units here too, so nothing is rounded.
func outline(face *sfnt.Font, buf *sfnt.Buffer, glyph uint16) []Segment {
	segments, err := face.LoadGlyph(buf, sfnt.GlyphIndex(glyph), fixed.I(1000), nil)
	if err != nil {
		panic(err)
	}
	path := make([]Segment, 0, len(segments))
	for _, s := range segments {
		switch s.Op {
		case sfnt.SegmentOpMoveTo:
			path = append(path, Segment{Kind: Move, P: point(s.Args[0])})
		case sfnt.SegmentOpLineTo:
			path = append(path, Segment{Kind: Line, P: point(s.Args[0])})
		case sfnt.SegmentOpQuadTo:
			path = append(path, Segment{Kind: Curve, C: point(s.Args[0]), P: point(s.Args[1])})
		}
	}
	return path
}

func point(p fixed.Point26_6) Point { return Point{float64(p.X) / 64, -float64(p.Y) / 64} }
