package figure

import (
	"cmp"
	"math"
	"slices"
)

// nameLeading is from line to line of a curve's name.
const nameLeading = 9.6

// tall is the height of a name.
func tall(lines []label) float64 { return nameLeading*float64(len(lines)) + 1.5 }

func widest(lines []label) float64 {
	w := 0.0
	for _, l := range lines {
		w = math.Max(w, l.set.Width)
	}
	return w
}

// stacked is the height of all names on each other.
func stacked(curves []curve) float64 {
	sum := 0.0
	for i := range curves {
		sum += tall(curves[i].name)
	}
	return sum
}

// names puts the names of the curves beside their ends, in the order of the
// ends and moved apart where these are close, each with a thin line to its end.
func (d *pad) names(a *axes, curves []curve, x float64) {
	var order []*curve
	for i := range curves {
		if len(curves[i].points) > 0 {
			order = append(order, &curves[i])
		}
	}
	slices.SortStableFunc(order, func(p, q *curve) int {
		// Ends within a tenth of a point are together.
		return cmp.Or(cmp.Compare(math.Round(10*p.end().Y), math.Round(10*q.end().Y)), cmp.Compare(p.middle(), q.middle()))
	})
	want, room := make([]float64, len(order)), make([]float64, len(order))
	for i, c := range order {
		room[i] = tall(c.name)
		want[i] = c.end().Y - room[i]/2
	}
	tops := apart(want, room, -a.height-6, 6)
	for i, c := range order {
		y := tops[i] + room[i]/2
		end := c.end()
		start := a.width + 4
		if x > 20 {
			start = a.width + 10
			d.faint(c.stroke, Point{start, y}, Point{a.width + x - 3, y})
		}
		if math.Abs(y-end.Y) > 1.5 || x > 20 {
			d.faint(fine, end, Point{start - 1, y})
		}
		for n, l := range c.name {
			at := Point{a.width + x, tops[i] + nameLeading*float64(n) + 0.8*nameLeading}
			if n > 0 && l.size != labelSize {
				l = l.in(soft)
			}
			d.put(l, at)
		}
	}
}

func (c *curve) end() Point { return c.points[len(c.points)-1] }

// middle is the mean height of a curve, which orders those that end together.
func (c *curve) middle() float64 {
	sum := 0.0
	for _, p := range c.points {
		sum += p.Y
	}
	return sum / float64(len(c.points))
}

// apart moves things that want to begin at certain places, given in order, so
// that none covers the next: those that would touch form a block about the mean of
// where they want to be. All end up between low and high if there is room.
func apart(want, room []float64, low, high float64) []float64 {
	type block struct {
		first     int
		top, size float64
		wish      float64 // where its members would have its top, summed
		members   float64
	}
	settle := func(b *block) {
		b.top = math.Max(math.Min(b.wish/b.members, high-b.size), low)
	}
	var blocks []block
	for i := range want {
		b := block{first: i, size: room[i], wish: want[i], members: 1}
		settle(&b)
		for len(blocks) > 0 {
			last := blocks[len(blocks)-1]
			if last.top+last.size <= b.top {
				break
			}
			b = block{first: last.first, size: last.size + b.size, wish: last.wish + b.wish - b.members*last.size, members: last.members + b.members}
			settle(&b)
			blocks = blocks[:len(blocks)-1]
		}
		blocks = append(blocks, b)
	}
	out := make([]float64, len(want))
	for n, b := range blocks {
		end := len(want)
		if n+1 < len(blocks) {
			end = blocks[n+1].first
		}
		top := b.top
		for i := b.first; i < end; i++ {
			out[i] = top
			top += room[i]
		}
	}
	return out
}
