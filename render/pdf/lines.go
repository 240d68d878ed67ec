package pdf

import "math"

// Lines are broken by total fit, as Knuth and Plass describe it ("Breaking
// Paragraphs into Lines", Software: Practice and Experience 11, 1981), in the
// plainest case: blanks neither stretch nor shrink and no word is hyphenated,
// so a line's only fault is the length left free at its right end. The break
// behind word j is reached at the least cost over all words i that its line
// could begin with,
//
//	best(j) = min over i of best(i) + cost(line i to j)
//
// and as a line holds only so many words, the time is linear in the text.

// line is a line of a paragraph: its words, its width and its extent about
// the baseline.
type line struct {
	from, to        int
	width           float64
	ascent, descent float64
}

// lines breaks a paragraph to a width. The paragraph must be fitted to it.
func (p *paragraph) lines(width float64) []line {
	var out []line
	from := 0
	for i := range p.words {
		if p.words[i].ends || i == len(p.words)-1 {
			out = p.breakLine(out, from, i+1, width)
			from = i + 1
		}
	}
	for i := range out {
		p.measure(&out[i])
	}
	return out
}

func (p *paragraph) measure(l *line) {
	for i := l.from; i < l.to; i++ {
		l.width += p.words[i].width
		if i+1 < l.to {
			l.width += p.words[i].space
		}
	}
	for _, c := range p.pieces[p.words[l.from].from:p.words[l.to-1].to] {
		a, d := 0.75*c.size, 0.25*c.size
		if c.box != nil {
			a, d = c.box.ascent, c.box.descent
		}
		l.ascent, l.descent = math.Max(l.ascent, a), math.Max(l.descent, d)
	}
}

// breakLine appends the lines of the words from..to, none of which ends a
// line but the last.
func (p *paragraph) breakLine(out []line, from, to int, width float64) []line {
	n := to - from
	ends := make([]float64, n+1) // where word i would begin if no line broke
	for i, w := range p.words[from:to] {
		ends[i+1] = ends[i] + w.width + w.space
	}
	if ends[n]-p.words[to-1].space <= width {
		return append(out, line{from: from, to: to})
	}
	best := make([]float64, n+1)
	prev := make([]int, n+1)
	for j := 1; j <= n; j++ {
		best[j] = math.Inf(1)
		w := p.words[from+j-1]
		for i := j - 1; i >= 0; i-- {
			set := ends[j] - w.space - ends[i]
			if set > width+0.001 && i < j-1 {
				break
			}
			c := best[i] + lineCost(set, width, j-i, j == n)
			if j < n {
				c += w.cost
			}
			if c < best[j] {
				best[j], prev[j] = c, i
			}
		}
	}
	first := len(out)
	for j := n; j > 0; j = prev[j] {
		out = append(out, line{from: from + prev[j], to: from + j})
	}
	for a, b := first, len(out)-1; a < b; a, b = a+1, b-1 {
		out[a], out[b] = out[b], out[a]
	}
	return out
}

// lineCost is what a line costs that is set to a length of the width. The
// unit is a line that leaves a tenth of the width free, or a short word where
// that is more; each line costs a little by itself, and a last line that is
// hardly there costs two units.
func lineCost(set, width float64, words int, last bool) float64 {
	const each, hardly, shortWord = 0.15, 0.2, 22
	if last {
		if words == 1 && set < hardly*width {
			return each + 2
		}
		return each
	}
	free := (width - set) / math.Max(0.1*width, shortWord)
	return each + free*free
}

// balanced is the least width at which a paragraph, as of a title, has no more
// lines than at a width: then they are of much the same length.
func (p *paragraph) balanced(width float64) float64 {
	const step = 6
	whole := p.fitted(width)
	_, least := whole.natural()
	for count := len(whole.lines(width)); width-step > least && len(whole.lines(width-step)) == count; {
		width -= step
	}
	return width
}

// few breaks a paragraph to a width into at most so many lines; where there
// are more the last one ends with an ellipsis.
func (p *paragraph) few(width float64, most int) (*paragraph, []line) {
	whole := p.fitted(width)
	lines := whole.lines(width)
	if len(lines) <= most {
		return whole, lines
	}
	const room = 14 // for the ellipsis
	cut := p.fitted(width - room)
	lines = cut.lines(width - room)[:most]
	last := &lines[most-1]
	end := cut.words[last.to-1]
	st := cut.pieces[end.to-1].style
	if st.face == nil {
		st = cellStyle
	}
	more := piece{style: st, text: "…", width: st.width("…")}
	out := &paragraph{pieces: append(append([]piece(nil), cut.pieces[:end.to]...), more)}
	out.words = append(out.words, cut.words[:last.to]...)
	out.words[last.to-1].to++
	out.words[last.to-1].width += more.width
	last.width += more.width
	return out, lines
}

// set draws a line with its baseline at (x, y). Neighbours of one style are
// one text: with ragged lines a line is mostly a single one.
func (p *paragraph) set(k *ink, l line, x, y float64) {
	var room [160]byte
	d := lineDrawing{ink: k, line: l, at: x, y: y, letters: room[:0]}
	blank := 0.0
	for i := l.from; i < l.to; i++ {
		w := p.words[i]
		for j := range p.pieces[w.from:w.to] {
			d.piece(&p.pieces[w.from+j], blank)
			blank = 0
		}
		blank = w.space
	}
	d.flush()
	d.closeLink()
}

// lineDrawing is a line half drawn: the text that may still grow and the link
// that is open.
type lineDrawing struct {
	ink      *ink
	line     line
	at, y    float64
	run      text
	letters  []byte
	linkFrom float64
	link     string
}

func (d *lineDrawing) piece(c *piece, blank float64) {
	if c.link != d.link {
		d.closeLink()
		d.link, d.linkFrom = c.link, d.at+blank
	}
	switch {
	case c.box != nil:
		d.flush()
		d.ink.add(&c.box.ink, d.at+blank, d.y)
	case len(d.letters) > 0 && d.run.style == c.style && (blank == 0 || math.Abs(blank-c.style.width(" ")) < 0.01):
		if blank > 0 {
			d.letters = append(d.letters, ' ')
		}
		d.letters = append(d.letters, c.text...)
	default:
		d.flush()
		d.run = text{x: d.at + blank, y: d.y, style: c.style}
		d.letters = append(d.letters, c.text...)
	}
	d.at += blank + c.width
}

func (d *lineDrawing) flush() {
	if len(d.letters) > 0 {
		d.run.text = string(d.letters)
		d.ink.texts = append(d.ink.texts, d.run)
		d.letters = d.letters[:0]
	}
}

func (d *lineDrawing) closeLink() {
	if d.link != "" {
		d.ink.areas = append(d.ink.areas, area{
			d.linkFrom, d.y - d.line.ascent, d.at - d.linkFrom, d.line.ascent + d.line.descent, d.link,
		})
	}
	d.link = ""
}
