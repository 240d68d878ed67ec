package figure

import (
	"fmt"
	"math"
	"strings"

	"gusset/render/fonts"
	"gusset/render/maths"
)

// Bar is a check in a plot of utilisations.
type Bar struct {
	Number      string     // "1.4"
	Note        string     // what is checked; where there is none the formula stands for it
	Formula     maths.Node // symbols only
	Mark        string     // the governing entry
	Ratio       float64    // NaN where there is none
	Utilisation string     // as printed, "" where there is none
	Word        string     // "OK", "NG", "not required"
	OK          bool
}

// The measures of bars.
const (
	barWords    = 138.0 // the column of what is checked
	barField    = 118.0 // from 0 to the end of the axis
	barHeight   = 7.0
	barLeading  = 9.8
	barGap      = 6.0
	leastEnd    = 1.2 // of the axis of utilisations
	furthestEnd = 3.0
)

// Bars draws the utilisations of checks as bars, with a line at 1.0. The
// verdict stands in words behind each.
func Bars(title string, list []Bar) *Drawing {
	d := newPad()
	end := leastEnd
	for _, b := range list {
		if b.Ratio > end {
			end = math.Min(b.Ratio, furthestEnd)
		}
	}
	s := newScale([2]float64{0, end}, false, 6)
	x := func(u float64) float64 { return barWords + 10 + barField*math.Min(s.at(math.Max(u, 0)), 1) }
	y := 0.0
	tops := make([]float64, len(list))
	words := make([][]label, len(list))
	for i := range list {
		tops[i] = y
		words[i] = d.barWords(&list[i])
		y += barLeading*float64(len(words[i])) + barGap
	}
	for _, t := range s.ticks {
		d.faint(stroke{hair, 0.4, nil}, Point{x(t), -4}, Point{x(t), y})
		d.putAt(d.tick(&s, t), Point{x(t), y + 10}, middle)
	}
	d.faint(axisLine, Point{x(0), -4}, Point{x(0), y})
	for i := range list {
		for n, l := range words[i] {
			d.put(l, Point{0, tops[i] + barLeading*float64(n) + 0.78*barLeading})
		}
		d.bar(&list[i], x, s.high, tops[i]+(barLeading*float64(len(words[i]))-barHeight)/2)
	}
	d.faint(stroke{ink, heavy, nil}, Point{x(1), -6}, Point{x(1), y})
	d.putAt(d.labelIn(maths.Text{Text: "utilisation"}, fonts.Sans, labelSize), Point{barWords + 10 + barField/2, y + 21}, middle)
	if len(list) == 0 {
		d.notes = append(d.notes, "there are no checks")
	}
	d.heading(title, Point{0, -14})
	if title == "" {
		title = "Utilisations of the checks"
	}
	return d.finish(title, describeBars(list))
}

// barWords is what is checked, with its number and governing entry.
func (d *pad) barWords(b *Bar) []label {
	var lines []label
	if b.Note == "" && b.Formula != nil {
		l := d.labelIn(b.Formula, fonts.Sans, labelSize)
		if l.set.Width <= barWords {
			lines = []label{l}
		} else {
			lines = d.wrap(l.plain, fonts.Sans, labelSize, barWords)
		}
	} else {
		lines = d.wrap(b.Note, fonts.Sans, labelSize, barWords)
	}
	under := b.Mark
	if b.Number != "" {
		under = strings.TrimSpace("(" + b.Number + ") " + b.Mark)
	}
	for _, l := range d.wrap(under, fonts.Sans, noteSize, barWords) {
		lines = append(lines, l.in(soft))
	}
	return lines
}

func (d *pad) bar(b *Bar, x func(float64) float64, end, top float64) {
	colour := green
	if !b.OK {
		colour = red
	}
	verdict := b.Word
	if b.Utilisation != "" {
		verdict = b.Utilisation + " " + b.Word
		width := math.Max(x(b.Ratio)-x(0), 0.6)
		d.fill(colour, box(x(0), top, width, barHeight)...)
		if b.Ratio > end*(1+alike) {
			// Two cuts near the end say that the bar is not to scale there.
			for _, at := range []float64{9, 5} {
				d.fill(white, Point{x(end) - at, top - 1}, Point{x(end) - at + 1.6, top - 1}, Point{x(end) - at - 0.4, top + barHeight + 1}, Point{x(end) - at - 2, top + barHeight + 1})
			}
		}
	} else if b.Word == "not required" {
		colour = soft
	}
	l := d.labelIn(maths.Text{Text: verdict}, fonts.SansSemiBold, labelSize).in(colour)
	d.put(l, Point{barWords + 10 + barField + 7, top + barHeight/2 + 0.34*labelSize})
}

func describeBars(list []Bar) string {
	if len(list) == 0 {
		return "There are no checks."
	}
	var b strings.Builder
	for i, bar := range list {
		if i > 0 {
			b.WriteByte(' ')
		}
		name := bar.Note
		if name == "" && bar.Formula != nil {
			name = string(maths.AppendPlain(nil, bar.Formula))
		}
		fmt.Fprintf(&b, "%s: %s.", name, strings.TrimSpace(bar.Utilisation+" "+bar.Word))
	}
	return b.String()
}
