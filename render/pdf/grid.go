package pdf

import "math"

// grid is a table before it is laid out: a head that is repeated on each page,
// and rows of cells that hold running text.
type grid struct {
	voice voice
	head  gridRow
	rows  []gridRow
	plain bool // without a line under each row
	wide  int  // the column, from 1, that takes what is left of the width
	// anchors are the ids of the columns.
	anchors []string
}

type gridRow struct {
	cells  []gridCell
	tinted bool
	anchor string
}

type gridCell struct {
	p     *paragraph
	align alignment
}

type alignment uint8

const (
	left alignment = iota
	right
	center
)

// The distances within a table.
const (
	columnGap = 12.0 // less where there are very many columns
	rowPad    = 2.6
	headRule  = 0.7
	rowRule   = 0.4
)

// shortTable is the most rows that are kept together.
const shortTable = 6

// grid pushes a table. It is built in the voice asked for, and in smaller ones
// where its words do not fit side by side. A row taller than the limit may
// break between lines.
func (f *flow) grid(v voice, build func(v voice) *grid, limit float64) {
	g := build(v)
	widths, gap, fits := g.widths(f.width)
	for _, scale := range []float64{0.87, 0.75} {
		if fits {
			break
		}
		smaller := v
		smaller.size, smaller.leading = v.size*scale, v.leading*scale
		g = build(smaller)
		widths, gap, fits = g.widths(f.width)
	}
	whole := sum(widths) + gap*float64(len(widths)-1)
	head := f.gridHead(g, widths, gap, limit/3)
	for i := range g.rows {
		row := &g.rows[i]
		parts := f.gridRow(g, row, widths, gap, limit)
		for j := range parts {
			s := &parts[j]
			s.head = head
			if j == 0 && row.anchor != "" {
				s.anchors = []string{row.anchor}
			}
			if row.tinted {
				s.bands = append(s.bands, band{x: f.x, width: whole, colour: washColour, starts: true})
			}
			last := j == len(parts)-1
			if last && (!g.plain || i == len(g.rows)-1) {
				s.ink.fill(f.x, s.height-rowRule, whole, rowRule, hairColour)
			}
			// The first row does not leave the head, nor the last the one before
			// it; a short table stands on one page.
			s.keep = i == 0 && len(g.rows) > 1 || i == len(g.rows)-2 || !last || len(g.rows) <= shortTable
			if i == len(g.rows)-1 && last || height(parts) > limit {
				s.keep = false
			}
			f.push(*s)
		}
	}
}

// gridHead pushes the head of a table and returns the slab that further pages
// repeat: nil where there is none, or where it is too tall to be repeated.
func (f *flow) gridHead(g *grid, widths []float64, gap, limit float64) *slab {
	if len(g.head.cells) == 0 {
		return nil
	}
	parts := f.gridRow(g, &g.head, widths, gap, limit)
	last := &parts[len(parts)-1]
	last.ink.fill(f.x, last.height-headRule, sum(widths)+gap*float64(len(widths)-1), headRule, inkColour)
	last.keep = len(g.rows) > 0
	f.anchors = append(f.anchors, g.anchors...)
	for _, s := range parts {
		f.push(s)
	}
	if len(parts) > 1 {
		return nil
	}
	return &parts[0]
}

// height is that of slabs with the gaps between them.
func height(slabs []slab) float64 { return extent(slabs, false) - slabs[0].gap }

// gridRow lays out a row: as one slab, or line by line where it is taller
// than the limit.
func (f *flow) gridRow(g *grid, row *gridRow, widths []float64, gap, limit float64) []slab {
	type cellLines struct {
		p     *paragraph
		lines []line
	}
	cells := make([]cellLines, len(row.cells))
	count := 1
	for i, c := range row.cells {
		if i < len(widths) {
			p := c.p.fitted(widths[i])
			cells[i] = cellLines{p, p.lines(widths[i])}
			count = max(count, len(cells[i].lines))
		}
	}
	parts := make([]slab, count)
	for n := range parts {
		s := &parts[n]
		ascent, descent := 0.72*g.voice.leading, 0.28*g.voice.leading
		for _, c := range cells {
			if n < len(c.lines) {
				a, d := lineExtent(c.lines[n], g.voice.leading)
				ascent, descent = math.Max(ascent, a), math.Max(descent, d)
			}
		}
		if n == 0 {
			ascent += rowPad
		}
		if n == count-1 {
			descent += rowPad
		}
		s.height, s.baseline = ascent+descent, ascent
		x := f.x
		for i, c := range cells {
			if n < len(c.lines) {
				l := c.lines[n]
				free := widths[i] - l.width
				at := x + map[alignment]float64{left: 0, right: free, center: free / 2}[row.cells[i].align]
				c.p.set(&s.ink, l, at, ascent)
			}
			if i < len(widths) {
				x += widths[i] + gap
			}
		}
	}
	if height(parts) > limit {
		return parts
	}
	return []slab{stack(parts)}
}

// stack joins slabs into one.
func stack(parts []slab) slab {
	out := parts[0]
	for i := 1; i < len(parts); i++ {
		out.ink.add(&parts[i].ink, 0, out.height)
		out.height += parts[i].height
	}
	return out
}

// widths shares the width of a column of text among the columns of a table:
// each gets what its widest cell needs where there is room for all; else each
// gets its widest word, and the rest is shared by what they still want. Where
// the words do not fit either, the widest of them are cut, but formulas only
// where there is no other way.
func (g *grid) widths(total float64) (widths []float64, gap float64, fits bool) {
	n := len(g.head.cells)
	for _, r := range g.rows {
		n = max(n, len(r.cells))
	}
	natural, least, solid := make([]float64, n), make([]float64, n), make([]float64, n)
	measure := func(r *gridRow) {
		for i, c := range r.cells {
			a, b := c.p.natural()
			natural[i], least[i], solid[i] = math.Max(natural[i], a), math.Max(least[i], b), math.Max(solid[i], c.p.solid())
		}
	}
	measure(&g.head)
	for i := range g.rows {
		measure(&g.rows[i])
	}
	gap = math.Min(columnGap, 0.3*total/float64(n))
	total -= gap * float64(n-1)
	if n > 1 { // one endless word does not starve the other columns
		for i := range least {
			least[i], solid[i] = math.Min(least[i], total/2), math.Min(solid[i], total/2)
		}
	}
	wants, needs := sum(natural), sum(least)
	out := make([]float64, n)
	switch {
	case wants <= total:
		for i := range out {
			out[i] = natural[i] + 0.01
		}
	case needs < total:
		out = g.fewestLines(natural, least, total)
	case sum(solid) < total:
		// What each needs up to one width for all, and what is solid in any case.
		level(total, func(most float64) float64 {
			for i := range out {
				out[i] = math.Max(solid[i], math.Min(least[i], most))
			}
			return sum(out)
		})
	default:
		for i := range out {
			out[i] = math.Max(total*least[i]/needs, 6)
		}
	}
	if spare := total - wants; g.wide > 0 && spare > 0 {
		out[g.wide-1] += spare
	}
	return out, gap, needs <= total
}

// fewestLines are the widths between the least and the natural ones at which
// the table has the fewest lines: alike for all columns beyond the least, where
// short heads and marks stay on a line and a long text breaks, or one column,
// such as the marks, whole and the others alike, or each by what it lacks.
func (g *grid) fewestLines(natural, least []float64, total float64) []float64 {
	var best []float64
	fewest := math.MaxInt
	take := func(widths []float64) {
		if n := g.lines(widths); n < fewest {
			best, fewest = widths, n
		}
	}
	for whole := -1; whole < len(least); whole++ {
		out := make([]float64, len(least))
		fill := func(most float64) float64 {
			for i := range out {
				extra := natural[i] - least[i] + 0.01
				if i != whole {
					extra = math.Min(extra, most)
				}
				out[i] = least[i] + extra
			}
			return sum(out)
		}
		if fill(0) > total {
			continue
		}
		level(total, fill)
		take(out)
	}
	wants, needs := sum(natural), sum(least)
	out := make([]float64, len(least))
	for i := range out {
		out[i] = least[i] + (total-needs)*(natural[i]-least[i])/(wants-needs)
	}
	take(out)
	return best
}

// lines is how many lines of text a table has at widths of its columns.
func (g *grid) lines(widths []float64) int {
	of := func(r *gridRow) int {
		most := 0
		for i, c := range r.cells {
			most = max(most, c.p.linesAt(widths[i]))
		}
		return most
	}
	n := of(&g.head)
	for i := range g.rows {
		n += of(&g.rows[i])
	}
	return n
}

// level fills columns up to the bound at which they take the total.
func level(total float64, fill func(most float64) float64) {
	low, high := 0.0, total
	for range 40 {
		if most := (low + high) / 2; fill(most) > total {
			high = most
		} else {
			low = most
		}
	}
	fill(low)
}

func sum(v []float64) float64 {
	s := 0.0
	for _, x := range v {
		s += x
	}
	return s
}
