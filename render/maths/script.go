package maths

import "strings"

// scripts is what is attached to a base: below it words or a node, above it
// primes and figures or a node.
type scripts struct {
	sub     []string
	subNode Node
	primes  int
	supText string
	supNode Node
	link    string
	governs bool
}

func (s *setter) script(n Script, st style) part {
	if base, ok := n.Base.(Symbol); ok && n.Sub == nil {
		return s.symbol(base, n.Sup, st)
	}
	base := s.row(n.Base, st)
	base.letter = isLetter(n.Base)
	return s.attach(base, scripts{subNode: n.Sub, supNode: n.Sup}, st)
}

// attach sets scripts to a base by the rules of OpenType MATH: each has its
// usual shift, more where it would come too near to its neighbours.
func (s *setter) attach(base part, sc scripts, st style) part {
	if sc.primes > 0 {
		// The face's prime stands at its height by itself.
		lean := base.lean
		letter := base.letter
		base = s.join(base, s.run(primes(sc.primes), s.text, st, sc.link), lean, 0)
		base.lean, base.letter = 0, letter
	}
	hasSub := len(sc.sub) > 0 || sc.subNode != nil
	hasSup := sc.supText != "" || sc.supNode != nil
	if !hasSub && !hasSup {
		return base
	}
	var sub, sup part
	if hasSub {
		sub = s.subscript(sc, st)
	}
	if hasSup {
		sup = s.superscript(sc, st)
	}
	drop, rise := s.shifts(base, sub, sup, hasSub, hasSup, st)
	all := base
	all.lean, all.letter = 0, false
	after := s.scaled(s.metrics.SpaceAfterScript, st)
	if hasSub {
		s.move(sub, base.width, drop)
		all.width = base.width + sub.width + after
		all.descent = max(all.descent, drop+sub.descent)
		all.ascent = max(all.ascent, sub.ascent-drop)
		all.to = sub.to
	}
	if hasSup {
		s.move(sup, base.width+base.lean, -rise)
		all.width = max(all.width, base.width+base.lean+sup.width+after)
		all.ascent = max(all.ascent, rise+sup.ascent)
		all.descent = max(all.descent, sup.descent-rise)
		all.to = sup.to
	}
	return all
}

func (s *setter) subscript(sc scripts, st style) part {
	st = st.crampedScript()
	if sc.subNode != nil {
		return s.row(sc.subNode, st)
	}
	text := sc.sub[0]
	if len(sc.sub) > 1 {
		text = strings.Join(sc.sub, ",")
	}
	return s.run(text, s.upright(sc.governs), st, sc.link)
}

func (s *setter) superscript(sc scripts, st style) part {
	st = st.script()
	if sc.supNode != nil {
		return s.row(sc.supNode, st)
	}
	return s.run(sc.supText, s.upright(sc.governs), st, sc.link)
}

// shifts is how far a subscript goes down and a superscript up.
func (s *setter) shifts(base, sub, sup part, hasSub, hasSup bool, st style) (drop, rise float64) {
	m := s.metrics
	if hasSub {
		drop = max(s.scaled(m.SubscriptShiftDown, st), sub.ascent-s.scaled(m.SubscriptTopMax, st))
		if !base.letter {
			drop = max(drop, base.descent+s.scaled(m.SubscriptBaselineDropMin, st))
		}
	}
	if !hasSup {
		return drop, 0
	}
	usual := m.SuperscriptShiftUp
	if st.cramped {
		usual = m.SuperscriptShiftUpCramped
	}
	rise = max(s.scaled(usual, st), sup.descent+s.scaled(m.SuperscriptBottomMin, st))
	if !base.letter {
		rise = max(rise, base.ascent-s.scaled(m.SuperscriptBaselineDropMax, st))
	}
	if !hasSub {
		return drop, rise
	}
	lack := s.scaled(m.SubSuperscriptGapMin, st) - ((rise - sup.descent) - (sub.ascent - drop))
	if lack > 0 {
		// The superscript goes up as far as it may, the subscript takes the rest.
		up := min(lack, max(0, s.scaled(m.SuperscriptBottomMaxWithSubscript, st)-(rise-sup.descent)))
		rise += up
		drop += lack - up
	}
	return drop, rise
}
