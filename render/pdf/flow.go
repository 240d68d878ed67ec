package pdf

import "math"

// flow collects the slabs of a document from top to bottom. It has a current
// column of text, narrowed by lists and quotations, with the bands that run
// beside it.
type flow struct {
	slabs   []slab
	x       float64 // left edge of the column
	width   float64
	bands   []band
	pushed  func(*ink) // sees the ink of every slab; nil where nobody asks
	gap     float64    // space asked for above the next slab
	snug    float64    // the most that it gets, where it is not 0
	anchors []string   // ids that the next slab starts
	// hanging is how far references hang down beside the entries that follow,
	// where mayHang says that those have none of their own.
	hanging float64
	mayHang bool
}

// space asks for a distance above the next slab. The largest that is asked
// for counts, so that distances do not add up.
func (f *flow) space(h float64) { f.gap = math.Max(f.gap, h) }

// push appends a slab at the column's current gap and bands.
func (f *flow) push(s slab) *slab {
	s.gap = math.Max(s.gap, f.gap)
	if f.snug > 0 {
		s.gap = math.Min(s.gap, f.snug)
	}
	f.gap, f.snug = 0, 0
	s.anchors, f.anchors = append(f.anchors, s.anchors...), nil
	if len(f.bands) > 0 {
		s.bands = append(append([]band(nil), f.bands...), s.bands...)
		for i := range f.bands {
			f.bands[i].starts = false
		}
	}
	f.slabs = append(f.slabs, s)
	if f.pushed != nil {
		f.pushed(&s.ink)
	}
	return &f.slabs[len(f.slabs)-1]
}

// inset runs a function with the column narrowed from the left and a band put
// beside it, none where its width is 0.
func (f *flow) inset(by float64, b band, run func()) {
	x, width, bands := f.x, f.width, f.bands
	// However deep the nesting, a column keeps room for some words.
	by = math.Max(math.Min(by, f.width-leastColumn), 0)
	f.x, f.width = f.x+by, f.width-by
	if b.width > 0 {
		b.starts = true
		f.bands = append(append([]band(nil), bands...), b)
	}
	run()
	f.x, f.width = x, width
	if b.width > 0 {
		// The bands outside have begun if one inside them has.
		for i := range bands {
			bands[i].starts = f.bands[i].starts
		}
		f.bands = bands
	}
}

// leastColumn is the narrowest column that nesting leaves.
const leastColumn = 120

// paragraph pushes the lines of a paragraph, a slab each, so that no page
// begins or ends with a single one of them.
func (f *flow) paragraph(p *paragraph, leading float64) {
	p = p.fitted(f.width)
	lines := p.lines(f.width)
	for i, l := range lines {
		s := slab{keep: i == 0 && len(lines) > 1 || i == len(lines)-2}
		ascent, descent := lineExtent(l, leading)
		s.height, s.baseline = ascent+descent, ascent
		p.set(&s.ink, l, f.x, ascent)
		f.push(s)
	}
}

// lineExtent is how far a line reaches above and below its baseline: by the
// leading, and by more where a box in it needs more.
func lineExtent(l line, leading float64) (ascent, descent float64) {
	return math.Max(0.72*leading, l.ascent+0.5), math.Max(0.28*leading, l.descent+0.5)
}

// keep holds the last slab together with the next.
func (f *flow) keep() {
	if len(f.slabs) > 0 {
		f.slabs[len(f.slabs)-1].keep = true
	}
}
