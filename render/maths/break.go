package maths

import (
	"slices"
	"strings"
	"sync"

	"gusset/render/fonts"
)

// Break sets a chain for paper in lines no wider than width.
//
// What fits stays on one line. Else the line breaks before relations, each
// standing under the first one; a right side that is longer than a line breaks
// before its loosest operators, then before tighter ones, then inside of
// brackets, and goes on under the first right side, set in the further the
// deeper the place where it breaks. Fractions and roots are
// never split: one that is wider than a line is set smaller, down to leastScale,
// and below that written out with a slash, which breaks again. A line without a
// place to break, such as an endless name, is cut.
func Break(c Chain, size, width float64) []Box {
	room := rooms.Get().(*room)
	s := &setter{size: size, text: fonts.Serif, metrics: fonts.MathMetrics(), items: room.set[:0]}
	b := breaker{setter: s, width: width, st: style{display: true}, right: Open, line: Box{Items: room.line[:0]}}
	b.chain(c)
	b.finish()
	room.set, room.line = s.items, b.line.Items
	rooms.Put(room)
	return b.lines
}

// room is where formulas are set before they are put into lines; one serves many.
type room struct{ set, line []Item }

var rooms = sync.Pool{New: func() any { return new(room) }}

// leastScale is how small a fraction may be set so as not to be split, and
// hang how far lines are set in, in ems, whose left side takes more than
// longLeft of the width. What breaks within a term or a bracket is set in by
// step more, as long as it leaves longLeft of the width.
const (
	leastScale = 0.7
	hang       = 2
	longLeft   = 0.45
	step       = 1
)

// A breaker fills lines with pieces.
type breaker struct {
	*setter
	width float64
	st    style
	lines []Box
	line  Box
	x     float64 // where the next piece goes
	right Class   // of the piece before it on the line
	full  bool    // there is one
	inner bool    // the lines stand inside of something else
	limit int     // pieces that may still be opened; a bound on absurd input
}

// A piece is an atom between two places where a line may break.
type piece struct {
	part
	node        Node
	left, right Class
	rank        int // of the break before it
}

// pieces sets atoms one by one; prev is the class of what comes before them.
func (b *breaker) pieces(list []Node, prev Class) []piece {
	ps := make([]piece, 0, len(list)+2)
	comma := false
	for i, n := range list {
		left, right := classes(n, prev)
		p := piece{part: b.atom(n, prev, b.st), node: n, left: left, right: right, rank: rankNone}
		p.width += p.lean // what follows stands clear of a slanted letter
		o, ok := n.(Op)
		switch {
		case i == 0:
		case comma:
			p.rank = rankComma
		case ok && o.Class != Punct && !signs(o, prev):
			p.rank = rankOf(o)
		}
		comma = ok && o.Class == Punct
		ps = append(ps, p)
		prev = right
	}
	return ps
}

// gapBefore is the space before a piece at the present place.
func (b *breaker) gapBefore(right, left Class) float64 {
	return b.mu(gap(right, left, false), b.st)
}

// extent is the width of pieces from the present place on.
func (b *breaker) extent(ps []piece) float64 {
	x, right := 0.0, b.right
	for i, p := range ps {
		if i > 0 || b.full {
			x += b.gapBefore(right, p.left)
		} else {
			p = b.leading(p)
		}
		x += p.width
		right = p.right
	}
	return x
}

// alone is the width of pieces at the start of a line.
func (b *breaker) alone(ps []piece) float64 {
	fresh := breaker{setter: b.setter, st: b.st}
	return fresh.extent(ps)
}

func (b *breaker) fits(ps []piece) bool { return b.x+b.extent(ps) <= b.width+1e-6 }

func (b *breaker) place(ps ...piece) {
	for _, p := range ps {
		if b.full {
			b.x += b.gapBefore(b.right, p.left)
		} else {
			p = b.leading(p)
		}
		b.add(p.part, b.x, 0)
		b.x += p.width
		b.right, b.full = p.right, true
	}
}

// leading is a piece as it starts a line: a multiplication is written there.
func (b *breaker) leading(p piece) piece {
	if o, ok := p.node.(Op); ok && o.Sign == Beside.Sign {
		return b.pieces([]Node{Dot}, Ord)[0]
	}
	return p
}

// add copies a part into the line.
func (b *breaker) add(p part, x, y float64) {
	for _, item := range b.items[p.from:p.to] {
		item.X += x
		item.Y += y
		b.line.Items = append(b.line.Items, item)
	}
	b.line.Width = max(b.line.Width, x+p.width)
	b.line.Ascent = max(b.line.Ascent, p.ascent-y)
	b.line.Descent = max(b.line.Descent, p.descent+y)
}

func (b *breaker) finish() {
	if b.full {
		line := b.line
		line.Items = slices.Clone(line.Items)
		b.lines = append(b.lines, line)
	}
	b.line, b.full, b.right = Box{Items: b.line.Items[:0]}, false, Open
}

func (b *breaker) newLine(at float64) {
	b.finish()
	b.x = at
}

func (b *breaker) chain(c Chain) {
	em := b.em(b.st)
	var room [8]Node
	b.limit = 10_000
	if c.Left != nil {
		left := b.pieces(atoms(room[:0], c.Left), Open)
		b.fill(left, hang*em, hang*em)
	}
	relation, hanging := b.x+b.gapBefore(b.right, Rel), false
	if c.Left == nil {
		relation = 0
	} else if len(b.lines) > 0 || relation > longLeft*b.width {
		relation, hanging = hang*em, true
	}
	var under float64 // where the first right side starts
	sets := make([][]piece, len(c.Steps))
	for i, step := range c.Steps {
		sets[i] = b.pieces(atoms(append(room[:0], Relation(step.Sign)), step.Right), Open)
	}
	for i, ps := range sets {
		if i > 0 && b.full && compares(c.Steps[i]) {
			if all := compared(c, sets, i); !b.fits(all) && relation+b.alone(all) <= b.width+1e-6 {
				b.newLine(relation)
			}
		}
		if i == 0 {
			under = relation + ps[0].width + b.gapBefore(Rel, Ord)
		}
		// A choice is the last thing on its line: its mark reads to the right.
		chosen := i > 0 && endsInChoice(c.Steps[i-1].Right)
		if b.fits(ps) && !chosen {
			b.place(ps...)
			continue
		}
		if i > 0 || hanging {
			b.newLine(relation)
		}
		if b.fits(ps) {
			b.place(ps...)
			continue
		}
		b.place(ps[0])
		b.fill(ps[1:], under, under)
	}
}

// compares tells a comparison from the next way of writing the same.
func compares(s Step) bool { return Relation(s.Sign).Sign != "=" }

// compared is a comparison with all the ways of writing its right side, which
// share a line where they can: a capacity is not parted from its figures while
// the demand could have the line above to itself.
func compared(c Chain, sets [][]piece, from int) []piece {
	all := slices.Clip(sets[from])
	for i := from + 1; i < len(sets) && !compares(c.Steps[i]); i++ {
		all = append(all, sets[i]...)
	}
	return all
}

// fill sets pieces from the present place on. Lines that follow start at at, but
// at start where none of the pieces has found room before.
func (b *breaker) fill(ps []piece, start, at float64) {
	if len(ps) == 0 {
		return
	}
	if b.fits(ps) {
		b.place(ps...)
		return
	}
	rank := loosestOf(ps)
	if rank == rankNone {
		b.unbroken(ps, start, at)
		return
	}
	from, broken := 0, false
	for i := 1; i <= len(ps); i++ {
		if i < len(ps) && ps[i].rank != rank {
			continue
		}
		chunk := ps[from:i]
		if from > 0 {
			start = at
		}
		from = i
		// Behind a chunk that went over lines of its own the next one starts a
		// line, or its lines would look like those of the one before.
		if !b.fits(chunk) && b.x > start && (broken || b.worthALine(chunk, start)) {
			b.newLine(start)
		}
		before := len(b.lines)
		if rank == rankComma && len(chunk) > 1 && chunk[1].rank == rankRelation {
			chunk[1].rank = rankNone // a name stays with its value, however long
		}
		within := at
		if loosestOf(chunk) != rankNone {
			within = b.deeper(at)
		}
		b.fill(chunk, start, within)
		broken = len(b.lines) > before
	}
}

// loosestOf is the loosest rank at which pieces break.
func loosestOf(ps []piece) int {
	rank := rankNone
	for _, p := range ps[1:] {
		rank = min(rank, p.rank)
	}
	return rank
}

// deeper is where lines go on that break a level deeper than those that go on
// at at.
func (b *breaker) deeper(at float64) float64 {
	return max(at, min(at+step*b.em(b.st), (1-longLeft)*b.width))
}

// worthALine reports whether pieces that do not fit here go to a line of their
// own: they fit there, or little is left of this line.
func (b *breaker) worthALine(ps []piece, at float64) bool {
	return at+b.alone(ps) <= b.width+1e-6 || b.width-b.x < (b.width-at)/3
}

// unbroken sets pieces that have no operator to break at.
func (b *breaker) unbroken(ps []piece, start, at float64) {
	if b.x > start && start+b.alone(ps) <= b.width+1e-6 {
		b.newLine(start)
		b.place(ps...)
		return
	}
	widest := -1
	for i, p := range ps {
		if opens(p.node) && (widest < 0 || p.width > ps[widest].width) {
			widest = i
		}
	}
	if widest >= 0 && b.limit > 0 {
		b.limit--
		opened := append([]piece(nil), ps[:widest]...)
		opened = append(opened, b.open(ps[widest])...)
		if !isPair(ps[widest].node) {
			at = b.deeper(at)
		}
		b.fill(append(opened, ps[widest+1:]...), start, at)
		return
	}
	if b.x > start {
		b.newLine(start)
	}
	for i, p := range ps {
		tail := ps[i+1 : i+1+followers(ps[i+1:])]
		switch {
		case b.fits(ps[i : i+1+len(tail)]), follows(p) && b.fits(ps[i:i+1]):
			b.place(p)
		case b.full && b.room(p.left) < (b.width-at)/2:
			b.newLine(at)
			b.unbroken(ps[i:], at, at)
			return
		default:
			after := breaker{setter: b.setter, st: b.st, right: p.right, full: true}
			b.reduce(p, at, after.extent(tail))
		}
	}
}

// follows reports whether a piece stays on the line of the one before it, as a
// comma and a closing bracket do.
func follows(p piece) bool {
	return p.node == nil && p.left == Close || p.left == Punct
}

// followers is the number of pieces that stay on the line of the one before.
func followers(ps []piece) int {
	for i, p := range ps {
		if !follows(p) {
			return i
		}
	}
	return len(ps)
}

// opens reports whether a line may break inside of an atom.
func opens(n Node) bool {
	switch n := n.(type) {
	case Fence:
		return n.Body != nil
	case Script:
		f, ok := n.Base.(Fence)
		return ok && f.Body != nil
	}
	return false
}

// isPair tells a name with its value from brackets.
func isPair(n Node) bool {
	f, ok := n.(Fence)
	return ok && f.Open == ""
}

// open takes a fence apart: the brackets, as tall as the body asks, and the
// body's atoms. Scripts of the fence stay at its closing bracket.
func (b *breaker) open(p piece) []piece {
	script, scripted := p.node.(Script)
	f, ok := p.node.(Fence)
	if scripted {
		f, ok = script.Base.(Fence)
	}
	if !ok {
		return []piece{p}
	}
	f.Body = b.writtenOut(f.Body)
	mark := len(b.items)
	body := b.row(f.Body, b.st) // for its size
	b.items = b.items[:mark]
	shut := b.bracket(f.Close, false, body, b.st)
	if scripted {
		shut.ascent = max(shut.ascent, body.ascent)
		shut = b.attach(shut, scripts{subNode: script.Sub, supNode: script.Sup}, b.st)
	}
	open := piece{part: b.bracket(f.Open, true, body, b.st), left: p.left, right: Open, rank: p.rank}
	inside := b.pieces(atoms(nil, f.Body), Open)
	if isPair(f) { // and here too
		for i := range inside {
			if inside[i].rank == rankRelation {
				inside[i].rank = rankNone
			}
		}
	}
	list := append([]piece{open}, inside...)
	return append(list, piece{part: shut, left: Close, right: p.right, rank: rankNone})
}

// writtenOut is the body of a bracket, written out where it is one fraction or
// root that no line has room for: the bracket is to be no taller than its lines.
func (b *breaker) writtenOut(body Node) Node {
	list := atoms(nil, body)
	if len(list) != 1 {
		return body
	}
	switch list[0].(type) {
	case Fraction, Root:
		mark := len(b.items)
		p := b.row(body, b.st)
		b.items = b.items[:mark]
		if leastScale*p.width > b.width {
			return Row(written(list[0]))
		}
	}
	return body
}

// reduce sets a piece that is wider than a line, from the start of one, and
// keeps a width free for what follows it.
func (b *breaker) reduce(p piece, at, free float64) {
	room := b.room(p.left) - free
	if c, ok := p.node.(Choice); ok {
		// A choice within a choice only shrinks: setting each anew for each of
		// those about it would take for ever.
		if !b.inner {
			p.part = b.choice(c, b.st, room)
		}
		if p.width > room {
			p.part = b.smaller(c, b.choice(c, b.st, 0).width, room)
		}
		b.place(p)
		return
	}
	if room >= leastScale*p.width && p.node != nil {
		p.part = b.smaller(p.node, p.width, room)
		b.place(p)
		return
	}
	if list := written(p.node); list != nil && b.limit > 0 {
		b.limit--
		b.fill(b.pieces(list, Open), at, at)
		return
	}
	b.cut(p, at)
}

// smaller sets a node that is so wide at full size within a room. Its width
// is not quite in proportion to its size, since brackets and roots grow in
// steps.
func (b *breaker) smaller(n Node, width, room float64) part {
	full, mark := b.size, len(b.items)
	room = max(room, 0)
	var p part
	for range 8 {
		b.items = b.items[:mark]
		b.size *= room / max(width, room, 1e-9) * (1 - 1e-9)
		p = b.atom(n, Open, b.st)
		if width = p.width; width <= room {
			break
		}
	}
	b.size = full
	return p
}

// room is what is left of the line for a piece of a left class.
func (b *breaker) room(left Class) float64 {
	if b.full {
		return b.width - b.x - b.gapBefore(b.right, left)
	}
	return b.width - b.x
}

// written is an atom written out in one line of text; nil for one that has
// no such form.
func written(n Node) []Node {
	switch n := n.(type) {
	case Fraction:
		return atoms(append(atoms(nil, grouped(n.Num)), Slash), grouped(n.Den))
	case Root:
		var list []Node
		if n.Index != nil {
			list = append(list, Script{Sup: n.Index})
		}
		return atoms(append(list, Op{"√", Ord}), grouped(n.Body))
	case Script:
		if n.Base == nil || n.Sup == nil {
			return nil
		}
		return atoms(append(atoms(nil, grouped(n.Base)), Op{"^", Ord}), grouped(n.Sup))
	case Row:
		return atoms(nil, n)
	}
	return nil
}

// grouped is a node in brackets, unless it needs none in a line of text.
func grouped(n Node) Node {
	if n == nil || simple(n) {
		return n
	}
	return Paren(n)
}

// cut sets the text of a piece line by line. A line ends before a blank where a
// text has one, else behind whatever character is the last to fit.
func (b *breaker) cut(p piece, at float64) {
	face := b.text
	if _, ok := p.node.(Symbol); ok {
		face = fonts.SerifItalic
	}
	text := string(AppendPlain(nil, p.node))
	from := 0
	for from < len(text) {
		room := b.room(Ord)
		to, width, blank := from, 0.0, -1
		for i, r := range text[from:] {
			char := string(r)
			w := b.run(char, face, b.st, "").width
			if i == 0 && w > room && b.x > at {
				b.newLine(at)
				room = b.room(Ord)
			}
			if width+w > room && from+i > from {
				if blank > from {
					to = blank
				}
				break
			}
			if r == ' ' {
				blank = from + i
			}
			width += w
			to = from + i + len(char)
			if r == '\uFFFD' {
				to = min(from+i+1, len(text)) // a byte that is no text
			}
		}
		b.place(piece{part: b.run(text[from:to], face, b.st, ""), left: Ord, right: Ord})
		if from = to; from < len(text) {
			from += len(text[from:]) - len(strings.TrimLeft(text[from:], " "))
			b.newLine(at)
		}
	}
}

// leastFlow is the narrowest column that is worth breaking for, in ems.
const leastFlow = 4

// flow sets a node in lines within a width, for what stands inside of something
// else; the lines are wider where the width is next to nothing.
func (s *setter) flow(n Node, width float64, st style) []Box {
	width = max(width, leastFlow*s.em(st))
	b := breaker{setter: s, width: width, st: st, right: Open, inner: true, limit: 1000}
	at := min(hang*s.em(st), width/4)
	b.fill(b.pieces(atoms(nil, n), Open), at, at)
	b.finish()
	return b.lines
}
