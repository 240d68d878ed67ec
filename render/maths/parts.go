package maths

import (
	"slices"

	"gusset/render/fonts"
)

// A browser breaks a line only between formulas, so a right side is written
// in parts: before its loosest operators where it is longer than shortStep,
// which has room on a telephone's screen, and each part longer than longPart in
// turn at tighter operators. One that the column still has no room for is set
// smaller, down to leastScale; below that it is parted inside of its brackets,
// and last its roots and fractions are written out in line. Parts that fit
// stand as if they were one.
const (
	shortStep = 24
	longPart  = 44
	// partHang is what a continuation is set in, in ems, and leftWidth what a
	// character of the left side takes of the column.
	partHang  = 1.5
	leftWidth = 0.55
)

// shrink is how small atoms have to be set for their room, at most 1.
func (w *markup) shrink(list []Node) float64 {
	if ems(list) <= w.room {
		return 1
	}
	return min(1, w.room/measure(list))
}

// measure is the width of atoms in ems.
func measure(list []Node) float64 { return boxOf(Row(slices.Clone(list))).width }

// reachOf is how far a node reaches.
func reachOf(n Node) strut {
	b := boxOf(n)
	return strut{b.ascent, b.descent}
}

// boxOf sets a node on a line of its own at a size of 1.
func boxOf(n Node) part {
	room := rooms.Get().(*room)
	s := setter{size: 1, text: fonts.Serif, metrics: fonts.MathMetrics(), items: room.set[:0]}
	p := s.row(n, style{display: true})
	room.set = s.items
	rooms.Put(room)
	return p
}

// step writes one box of a chain. One after a choice has a line of its own.
func (w *markup) step(list []Node, after bool) {
	if after {
		w.raw(`<span class="b">`)
	} else {
		w.raw("<span>")
	}
	w.parts(list, Open, shortStep)
	w.raw("</span>")
}

// parts writes atoms that stand behind a class in parts no longer than most.
func (w *markup) parts(list []Node, prev Class, most int) {
	n := length(list)
	if n <= most {
		w.math(list, prev)
		return
	}
	rank := breakable(list)
	if rank == rankNone || rank == rankBeside && n < 2*shortStep {
		if n > shortStep && flatCall(list) || w.shrink(list) < leastScale {
			if open := opened(list); open != nil {
				w.parts(open, prev, longPart)
				return
			}
		}
		w.math(list, prev)
		return
	}
	from := 0
	for i := 1; i <= len(list); i++ {
		if i < len(list) && rankBefore(list, i) != rank {
			continue
		}
		if from > 0 && rank == rankBeside {
			list[from] = Dot // what may start a line is written
		}
		w.parts(list[from:i], prev, longPart)
		_, prev = list[i-1].edges()
		from = i
	}
}

// flatCall reports whether the last of atoms is the brackets of a function or of
// a named column with nothing in them that they have to grow for.
func flatCall(list []Node) bool {
	i := len(list) - 1
	if i < 1 {
		return false
	}
	f, ok := list[i].(Fence)
	_, right := list[i-1].edges()
	return ok && (right == Func || right == Rel) && f.Open == "(" && flat(f.Body)
}

func flat(n Node) bool {
	switch n := n.(type) {
	case Row:
		for _, c := range n {
			if !flat(c) {
				return false
			}
		}
		return true
	case Fence:
		return n.Open == "" && flat(n.Body)
	case Symbol, Number, Word, Text, Op, Space:
		return true
	}
	return false
}

// breakable is the loosest rank at which atoms can be parted.
func breakable(list []Node) int {
	rank := rankNone
	for i := 1; i < len(list); i++ {
		rank = min(rank, rankBefore(list, i))
	}
	return rank
}

// rankBefore is the rank of a break before an atom: that of an operator there
// or of a comma behind which it stands. A name stays with its relation.
func rankBefore(list []Node, i int) int {
	left, prev := list[i-1].edges()
	if o, ok := list[i-1].(Op); ok && left == Punct {
		return rankOf(o)
	}
	if o, ok := list[i].(Op); ok && o.Class != Punct && !signs(o, prev) && (i > 1 || o.Class != Rel || rankOf(o) != rankRelation) {
		return rankOf(o)
	}
	return rankNone
}

// opened is a list of atoms whose longest bracket is open to the line, so that
// it can be parted inside; nil where there is nothing to open.
func opened(list []Node) []Node {
	at := -1
	var inside []Node
	for i, n := range list {
		if at >= 0 && width(n) <= width(list[at]) {
			continue
		}
		if in := inner(n); in != nil {
			at, inside = i, in
		}
	}
	if at < 0 {
		return nil
	}
	out := append([]Node(nil), list[:at]...)
	out = append(out, inside...)
	return append(out, list[at+1:]...)
}

// inner is an atom in the line: a bracket's signs and what stands between them,
// a root or a fraction as written out; nil for what has no such form.
func inner(n Node) []Node {
	script, scripted := n.(Script)
	f, fenced := n.(Fence)
	if scripted {
		f, fenced = script.Base.(Fence)
	}
	switch {
	case fenced && f.Open != "" && f.Close != "" && f.Body != nil:
		var open, shut Node = Op{f.Open, Open}, Op{f.Close, Close}
		if tall(f.Body) {
			reach := reachOf(f.Body)
			open, shut = Fence{Open: f.Open, Body: reach}, Fence{Body: reach, Close: f.Close}
		}
		if scripted {
			shut = Script{Base: shut, Sub: script.Sub, Sup: script.Sup}
		}
		return append(atoms([]Node{open}, f.Body), shut)
	case scripted:
		return nil
	}
	return written(n)
}

// ems is what atoms take at most in width: what is short enough by that needs
// no measuring.
func ems(list []Node) float64 {
	sum := 0.0
	for _, n := range list {
		sum += widest(n)
	}
	return sum
}

// The widest that a figure and a letter are on average.
const (
	figure = 0.61
	letter = 0.75
)

func widest(n Node) float64 {
	switch n := n.(type) {
	case Row:
		return ems(n)
	case Op:
		if n.Sign == Beside.Sign {
			return 0.2
		}
		if n.Class == Punct {
			return 0.5
		}
		return 1.15 + letter*float64(max(len(n.Sign)-3, 0))
	case Fraction:
		return max(widest(n.Num), widest(n.Den)) + 0.25
	case Script:
		return widest(n.Base) + 0.8*max(widest(n.Sub), widest(n.Sup))
	case Root:
		return 1 + widest(n.Body)
	case Fence:
		return 1.1 + widest(n.Body) // the brackets may have grown
	case Number:
		w := figure*float64(len(n.Value)) + widest(n.Unit)
		if _, _, power := figures(n.Value); power != "" {
			w += 2 // ×10
		}
		return w
	case Unit:
		w := 0.0
		for _, t := range n {
			w += 0.35 + 0.92*float64(len(t.Name))
			if t.Open || t.Close || t.Num < 0 || t.Den > 1 {
				w += 0.7
			}
		}
		return w
	case Choice:
		w := 0.0
		for _, b := range n.Branches {
			w = max(w, widest(b.Value)+widest(b.Cond))
		}
		return w + 8
	}
	return letter * (float64(width(n)) + 0.5)
}
