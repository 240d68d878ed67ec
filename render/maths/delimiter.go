package maths

import (
	"math"

	"gusset/render/fonts"
)

// tall sets a bracket or a root sign at least height tall, its ink starting at
// the baseline. It is the smallest variant that reaches, else put together from
// pieces.
func (s *setter) tall(sign rune, height float64, st style) part {
	em := s.em(st)
	need := height * 1000 / em
	growth := s.metrics.Growth(fonts.Math.Glyph(sign))
	for _, v := range growth.Variants {
		if float64(v.Height) >= need-1e-6 {
			return s.glyph(v.Glyph, em)
		}
	}
	if len(growth.Parts) == 0 {
		if n := len(growth.Variants); n > 0 {
			return s.glyph(growth.Variants[n-1].Glyph, em)
		}
		return s.run(string(sign), fonts.Math, st, "")
	}
	return s.assemble(growth.Parts, need, em)
}

// glyph adds an outline whose ink stands on the baseline.
func (s *setter) glyph(glyph uint16, em float64) part {
	p := s.start()
	_, low, _, high := fonts.Math.Bounds(glyph)
	s.outline(glyph, em, float64(low)*em/1000)
	p.to = len(s.items)
	p.width = float64(fonts.Math.GlyphAdvance(glyph)) * em / 1000
	p.ascent = float64(high-low) * em / 1000
	return p
}

func (s *setter) outline(glyph uint16, em, y float64) {
	s.items = append(s.items, Item{Kind: Outline, Y: y, Size: em, Path: outlines()[glyph]})
}

// assemble puts a glyph together from its pieces, from below: the pieces that
// repeat are repeated until the sum reaches, and the overlaps then widened
// evenly to take up what is too much.
func (s *setter) assemble(parts []fonts.Part, need, em float64) part {
	repeats := repeatsFor(parts, need, s.metrics.MinOverlap)
	list := repeated(parts, repeats)
	shortest, longest := reach(parts, repeats, s.metrics.MinOverlap)
	share := 0.0 // of the way from the least overlaps to the largest
	if longest > shortest {
		share = min(1, max(0, (longest-need)/(longest-shortest)))
	}
	p := s.start()
	y := 0.0
	for i, part := range list {
		if i > 0 {
			least, most := overlap(list[i-1], part, s.metrics.MinOverlap)
			y -= least + share*(most-least)
		}
		_, low, _, _ := fonts.Math.Bounds(part.Glyph)
		s.outline(part.Glyph, em, (float64(low)-y)*em/1000)
		p.width = max(p.width, float64(fonts.Math.GlyphAdvance(part.Glyph))*em/1000)
		y += float64(part.Height)
	}
	p.to = len(s.items)
	p.ascent = y * em / 1000
	return p
}

// repeatsFor is how often the pieces that extend are needed to reach.
func repeatsFor(parts []fonts.Part, need float64, minOverlap int) int {
	_, none := reach(parts, 0, minOverlap)
	_, once := reach(parts, 1, minOverlap)
	_, twice := reach(parts, 2, minOverlap)
	switch {
	case none >= need:
		return 0
	case once >= need || twice <= once:
		return 1
	}
	return 1 + int(math.Ceil((need-once)/(twice-once)))
}

// repeated lists the pieces with those that extend so many times.
func repeated(parts []fonts.Part, repeats int) []fonts.Part {
	var list []fonts.Part
	for _, p := range parts {
		n := 1
		if p.Extender {
			n = repeats
		}
		for range n {
			list = append(list, p)
		}
	}
	return list
}

// reach is how tall the pieces are at their largest and least overlaps.
func reach(parts []fonts.Part, repeats, minOverlap int) (shortest, longest float64) {
	list := repeated(parts, repeats)
	for i, p := range list {
		shortest += float64(p.Height)
		longest += float64(p.Height)
		if i > 0 {
			least, most := overlap(list[i-1], p, minOverlap)
			shortest -= most
			longest -= least
		}
	}
	return shortest, longest
}

// overlap is the least and the largest overlap of two pieces.
func overlap(below, above fonts.Part, minOverlap int) (least, most float64) {
	least = float64(minOverlap)
	most = max(least, float64(min(below.End, above.Start)))
	return least, most
}

// How much of a body a bracket must cover: this share of it, and all but this
// many ems. A superscript may look out; a fraction may not.
const (
	coveredShare = 0.8
	uncovered    = 0.4
)

// bracketSide is the room between a tall bracket and its body, in thousandths
// of an em.
const bracketSide = 60

// bracket sets a bracket that fits a body, centred on the axis; nothing for an
// empty one. One that is no larger than a letter is text.
func (s *setter) bracket(sign string, open bool, body part, st style) part {
	if sign == "" {
		return s.start()
	}
	em := s.em(st)
	axis := s.scaled(s.metrics.AxisHeight, st)
	full := 2 * max(body.ascent-axis, body.descent+axis)
	need := max(coveredShare*full, full-uncovered*em)
	var r rune
	for _, r = range sign {
		break
	}
	_, low, _, high := fonts.Math.Bounds(fonts.Math.Glyph(r))
	if need <= float64(high-low)*em/1000 || len(s.metrics.Growth(fonts.Math.Glyph(r)).Variants) == 0 {
		return s.run(sign, fonts.Math, st, "")
	}
	p := s.tall(r, need, st)
	down := p.ascent/2 - axis
	// The ink of the face's tall brackets ends where their room does.
	side := s.scaled(bracketSide, st)
	if open {
		s.move(p, 0, down)
	} else {
		s.move(p, side, down)
	}
	p.width += side
	p.ascent, p.descent = p.ascent-down, down
	return p
}
