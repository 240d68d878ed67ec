package maths

// choice sets the branches of a choice behind a brace that spans them, the
// conditions in a column. Within a width other than 0 that has no room for
// this, conditions stand below their values, and what is longer than a line
// breaks.
func (s *setter) choice(c Choice, st style, width float64) part {
	// What a choice on a line of its own offers is read as closely as any
	// formula there.
	within := st
	em := s.em(st)
	indent := widestBrace * em // kept free for the brace
	body := s.start()
	var list [][2]part // value and condition
	values, conditions := 0.0, 0.0
	for _, b := range c.Branches {
		value, cond := s.row(b.Value, within), s.row(condition(b), within)
		value.width += value.lean
		values, conditions = max(values, value.width), max(conditions, cond.width)
		list = append(list, [2]part{value, cond})
	}
	y := 0.0 // the foot of the branch above
	if width > 0 && indent+values+em+conditions > width {
		s.items = s.items[:body.from]
		for i, b := range c.Branches {
			if i > 0 {
				y += 2 * s.scaled(branchGap, st)
			}
			y = s.stackLines(&body, b.Value, within, 0, y, width-indent)
			y += s.scaled(branchGap, st)
			y = s.stackLines(&body, condition(b), within, em, y, width-indent-em)
		}
		return s.brace(body, y, st)
	}
	for i, parts := range list {
		if i > 0 {
			y += s.scaled(branchGap, st)
		}
		line := s.join(parts[0], parts[1], values-parts[0].width+em, 0)
		y = s.stack(&body, line, 0, y, em)
	}
	return s.brace(body, y, st)
}

// widestBrace is the most that a brace and the room behind it take, in ems.
const widestBrace = 0.9

// branchGap is the room between two branches in thousandths of an em.
const branchGap = 450

// condition is what stands behind a branch's value. An arrow marks the branch
// that was taken.
func condition(b Branch) Row {
	list := Row{Text{Text: "otherwise"}}
	if b.Cond != nil {
		list = Row{Text{Text: "if"}, Blank, b.Cond}
	}
	if b.Taken {
		list = append(list, Blank, Blank, Text{Text: "←"})
	}
	return list
}

// stackLines sets a node in lines below y and returns the foot of the last.
func (s *setter) stackLines(body *part, n Node, st style, x, y, width float64) float64 {
	mark := len(s.items)
	lines := s.flow(n, width, st)
	s.items = s.items[:mark]
	for i, l := range lines {
		if i > 0 {
			y += s.scaled(branchGap, st)
		}
		p := s.start()
		s.items = append(s.items, l.Items...)
		p.to = len(s.items)
		p.width, p.ascent, p.descent = l.Width, l.Ascent, l.Descent
		y = s.stack(body, p, x, y, s.em(st))
	}
	return y
}

// stack sets a line below y, no shorter than a line of letters, and returns
// its foot.
func (s *setter) stack(body *part, line part, x, y, em float64) float64 {
	base := y + max(line.ascent, lineAscent*em)
	s.move(line, x, base)
	body.width = max(body.width, x+line.width)
	body.to = line.to
	return base + max(line.descent, lineDescent*em)
}

// The height of a line of letters about its baseline, in ems.
const (
	lineAscent  = 0.72
	lineDescent = 0.22
)

// brace centres a body of a height on the axis and sets a brace before it.
func (s *setter) brace(body part, height float64, st style) part {
	axis := s.scaled(s.metrics.AxisHeight, st)
	brace := s.tall('{', height, st)
	down := brace.ascent/2 - axis
	indent := brace.width + s.em(st)/4
	s.move(body, indent, -axis-height/2)
	s.move(brace, 0, down)
	first, _ := s.swap(body, brace)
	return part{
		width:   indent + body.width,
		ascent:  max(height/2+axis, brace.ascent-down),
		descent: max(height/2-axis, down),
		from:    first.from, to: brace.to,
	}
}
