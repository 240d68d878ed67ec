package maths

import "gusset/render/fonts"

// row sets a node and, if it is a row, its atoms side by side.
func (s *setter) row(n Node, st style) part {
	r, ok := n.(Row)
	if !ok {
		return s.atom(n, Open, st)
	}
	var room [16]Node
	p := s.start()
	prev := Open
	for i, a := range atoms(room[:0], r) {
		left, right := classes(a, prev)
		space := 0.0
		if i > 0 {
			space = p.lean + s.mu(gap(prev, left, st.level > 0), st)
		}
		p = s.join(p, s.atom(a, prev, st), space, 0)
		prev = right
	}
	p.letter = isLetter(r)
	return p
}

// classes are the edges of an atom after one of right class prev: a sign is
// an ordinary atom.
func classes(n Node, prev Class) (left, right Class) {
	if o, ok := n.(Op); ok && signs(o, prev) {
		return Ord, Open
	}
	return n.edges()
}

// mu is a length in eighteenths of an em.
func (s *setter) mu(eighteenths int, st style) float64 {
	return float64(eighteenths) * s.em(st) / 18
}

func (s *setter) atom(n Node, prev Class, st style) part {
	switch n := n.(type) {
	case Row:
		return s.row(n, st)
	case Symbol:
		return s.symbol(n, nil, st)
	case Number:
		return s.number(n, st)
	case Unit:
		return s.unit(n, s.upright(false), st, "")
	case Word:
		return s.run(n.Text, s.upright(n.Governs), st, n.Target)
	case Text:
		return s.run(n.Text, s.upright(n.Governs), st, n.Target)
	case Op:
		return s.op(n, st)
	case Space:
		p := s.start()
		p.width = s.mu(max(int(n), 0), st)
		return p
	case Fraction:
		return s.fraction(n, st)
	case Script:
		return s.script(n, st)
	case Root:
		return s.root(n, st)
	case Fence:
		return s.fence(n, st)
	case Choice:
		return s.choice(n, st, 0)
	}
	return s.start()
}

// upright is the face of words and figures.
func (s *setter) upright(governs bool) *fonts.Face {
	switch {
	case governs && s.text == fonts.Serif:
		return fonts.SerifSemiBold
	case governs && s.text == fonts.Sans:
		return fonts.SansSemiBold
	}
	return s.text
}

func (s *setter) op(o Op, st style) part {
	if o.Sign == Beside.Sign {
		p := s.start()
		p.width = s.mu(int(Thin), st)
		return p
	}
	if o.Class == Punct || o.Sign != "" && o.Sign[0] >= 'a' && o.Sign[0] <= 'z' {
		return s.run(o.Sign, s.text, st, "")
	}
	return s.run(o.Sign, fonts.Math, st, "")
}

// isLetter reports whether scripts sit on a node as on a letter.
func isLetter(n Node) bool {
	switch n := n.(type) {
	case Symbol, Number, Word, Text, Unit:
		return true
	case Row:
		return len(n) == 1 && isLetter(n[0])
	}
	return false
}

// symbol sets a quantity's name, with a superscript of its own if any.
func (s *setter) symbol(n Symbol, sup Node, st style) part {
	face := fonts.SerifItalic
	if n.Governs {
		face = fonts.SerifSemiBoldItalic
	}
	letters, figs := split(n.Head)
	base := s.run(letters, face, st, n.Target)
	back := s.scaled(backhang(letters), st)
	s.move(base, back, 0)
	base.width += back
	if figs != "" {
		base = s.join(base, s.run(figs, s.upright(n.Governs), st, n.Target), base.lean, 0)
	}
	base.letter = true
	return s.attach(base, scripts{sub: n.Sub, primes: n.Primes, supNode: sup, link: n.Target, governs: n.Governs}, st)
}

func (s *setter) number(n Number, st style) part {
	face := s.upright(n.Governs)
	negative, mantissa, power := figures(n.Value)
	if negative {
		mantissa = "−" + mantissa
	}
	p := s.run(mantissa, face, st, n.Target)
	if power != "" {
		med := s.mu(4, st)
		p = s.join(p, s.run("×", fonts.Math, st, n.Target), med, 0)
		ten := s.run("10", face, st, n.Target)
		ten.letter = true
		if power[0] == '-' {
			power = "−" + power[1:]
		}
		p = s.join(p, s.attach(ten, scripts{supText: power, link: n.Target, governs: n.Governs}, st), med, 0)
	}
	if len(n.Unit) > 0 {
		p = s.join(p, s.unit(n.Unit, face, st, n.Target), s.mu(int(n.Gap()), st), 0)
	}
	p.letter = true
	return p
}

func (s *setter) unit(u Unit, face *fonts.Face, st style, link string) part {
	var room [64]byte
	if u.flat() {
		return s.run(string(appendFlat(room[:0], u)), face, st, link)
	}
	p := s.start()
	for _, t := range u {
		name := s.run(string(appendTerm(room[:0], t)), face, st, link)
		name.letter = true
		if e := exponent(t); e != "" {
			name = s.attach(name, scripts{supText: e, link: link}, st)
		}
		p = s.join(p, name, 0, 0)
		if t.Close {
			p = s.join(p, s.run(")", face, st, link), 0, 0)
		}
	}
	return p
}

// fraction sets a numerator over a denominator (OpenType MATH: shift, but at
// least gap from the rule, which lies on the axis).
func (s *setter) fraction(f Fraction, st style) part {
	m := s.metrics
	up, down, over, under := m.FractionNumeratorShiftUp, m.FractionDenominatorShiftDown, m.FractionNumeratorGapMin, m.FractionDenominatorGapMin
	if st.display {
		up, down, over, under = m.FractionNumeratorDisplayShiftUp, m.FractionDenominatorDisplayShiftDown, m.FractionNumeratorDisplayGapMin, m.FractionDenominatorDisplayGapMin
	}
	p := s.start()
	num := s.row(f.Num, st.over())
	den := s.row(f.Den, st.under())
	num.width += num.lean
	den.width += den.lean
	axis, thick := s.scaled(m.AxisHeight, st), s.scaled(m.FractionRuleThickness, st)
	rise := max(s.scaled(up, st), axis+thick/2+s.scaled(over, st)+num.descent)
	drop := max(s.scaled(down, st), -axis+thick/2+s.scaled(under, st)+den.ascent)
	side := s.scaled(fractionSide, st)
	line := max(num.width, den.width) + 2*side
	s.move(num, side+(line-2*side-num.width)/2, -rise)
	s.move(den, side+(line-2*side-den.width)/2, drop)
	s.rule(0, -axis-thick/2, line, thick)
	p.to = len(s.items)
	p.width = line
	p.ascent = rise + num.ascent
	p.descent = drop + den.descent
	return p
}

// fractionSide is how far a fraction's rule looks out at either side, in
// thousandths of an em: enough to tell it from a rule drawn under its text.
const fractionSide = 50

// rootSide is the room before and behind what stands under a root, in
// thousandths of an em.
const rootSide = 40

// root sets a root sign, its rule and what is under it.
func (s *setter) root(r Root, st style) part {
	m := s.metrics
	within := st
	within.cramped = true
	p := s.start()
	var index part
	if r.Index != nil {
		index = s.row(r.Index, style{level: 2, cramped: true})
	}
	body := s.row(r.Body, within)
	body.width += body.lean
	clear := m.RadicalGap
	if st.display {
		clear = m.RadicalDisplayGap
	}
	room, thick := s.scaled(clear, st), s.scaled(m.RadicalRuleThickness, st)
	need := body.ascent + body.descent + room + thick
	sign := s.tall('√', need, st)
	// A sign that is too tall shares what is left above and below the body.
	room += (sign.ascent - need) / 2
	top := body.ascent + room + thick
	low := sign.ascent - top // below the baseline
	x := 0.0
	if r.Index != nil {
		before, after := s.scaled(m.RadicalKernBeforeDegree, st), s.scaled(m.RadicalKernAfterDegree, st)
		raise := float64(m.RadicalDegreeRaisePercent) / 100 * sign.ascent
		// The kern before is room that a narrow index does not need.
		before = min(before, max(0, -after-index.width))
		s.move(index, before, low-raise-index.descent)
		x = max(0, before+index.width+after)
	}
	s.move(sign, x, low)
	x += sign.width
	side := s.scaled(rootSide, st)
	s.move(body, x+side, 0)
	s.rule(x, -top, body.width+2*side, thick)
	p.to = len(s.items)
	p.width = x + body.width + 2*side
	p.ascent = top + s.scaled(m.RadicalExtraAscender, st)
	p.descent = max(low, body.descent)
	if r.Index != nil {
		raise := float64(m.RadicalDegreeRaisePercent) / 100 * sign.ascent
		p.ascent = max(p.ascent, raise-low+index.ascent+index.descent)
		p.width = max(p.width, index.width)
	}
	return p
}

func (s *setter) fence(f Fence, st style) part {
	body := s.row(f.Body, st)
	open := s.bracket(f.Open, true, body, st)
	// The opening bracket is set when the body's size is known, and read first.
	open, body = s.swap(body, open)
	shut := s.bracket(f.Close, false, body, st)
	body.width += body.lean
	return s.join(s.join(open, body, 0, 0), shut, 0, 0)
}
