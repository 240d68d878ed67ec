package syntax

import (
	"fmt"
	"strconv"

	"gusset/notebook/diag"
)

// maxSteps bounds the points of a plot.
const maxSteps = 10_000

// plot reads the lines of a plot block; info is what stands behind `plot`.
func (p *parser) plot(plot *Plot, info Line) {
	failed := false
	if info.Start < info.End {
		if word := p.s[info.Start:info.End]; word == "checks" {
			plot.Checks = true
		} else {
			p.report(diag.Error, p.span(info.Start, info.End), diag.Syntax, fmt.Sprintf("%s says nothing behind `plot`", quoted(word)),
				"`plot checks` draws the utilisations of the file's checks; what else is drawn stands in the lines below")
			failed = true
		}
	}
	for p.next < len(p.lines) {
		line := p.lines[p.next]
		l := trimmed(p.s, line.Start, line.End)
		switch {
		case l.Start == l.End, p.isRemark(line):
			p.next++
			continue
		case p.s[l.Start] == '#':
			p.next++
			if !plot.Note.isSet() {
				plot.Note = p.noteAt(l.Start, l.End)
			}
			continue
		}
		if p.isTitle(l) {
			p.title(plot, l)
			p.next++
			continue
		}
		p.readStatement()
		p.begin()
		p.plotLine(plot)
		p.finish()
		failed = failed || p.failed
		if !plot.Note.isSet() {
			plot.Note = p.note
		}
	}
	plot.Slots = p.slots
	if !failed && !plot.Checks && plot.Against == nil {
		p.report(diag.Error, plot.At, diag.Syntax, "the plot says nothing to draw", "as in `tau against d from 16 mm to 40 mm`, or `plot checks`")
	}
}

func (p *parser) isTitle(l Line) bool {
	end := nameEnd(p.s, l.Start, l.End)
	next := blanksEnd(p.s, end)
	return p.s[l.Start:end] == "title" && next < l.End && next > end && p.s[next] != ',' && !p.wordAt(next, "against")
}

// wordAt tells whether a word stands at i.
func (p *parser) wordAt(i int, word string) bool {
	return p.s[i:nameEnd(p.s, i, len(p.s))] == word
}

// title takes the rest of the line as it stands, quotes around it aside.
func (p *parser) title(plot *Plot, l Line) {
	open := 0
	seg, note := p.takeNote(l, &open)
	if note < l.End && !plot.Note.isSet() {
		plot.Note = p.noteAt(note, l.End)
	}
	t := trimmed(p.s, seg.Start+len("title"), seg.End)
	text := p.s[t.Start:t.End]
	if n := len(text); n >= 2 && text[0] == '"' && text[n-1] == '"' {
		text = text[1 : n-1]
	}
	if plot.Title != "" {
		p.report(diag.Error, p.span(seg.Start, seg.End), diag.Syntax, "a plot has one title")
	}
	plot.Title = text
}

// plotLine reads one line of a plot: what is drawn against what, `limit`,
// `steps` or `checks`.
func (p *parser) plotLine(plot *Plot) {
	if p.tok != tName {
		if p.tok != tFailed {
			p.syntax(p.start, p.pos, fmt.Sprintf("a plot draws names against a name, as in `tau against d from 16 mm to 40 mm`, not %s", quoted(p.here())))
		}
		return
	}
	word := p.here()
	if i := p.skipBlanks(p.pos); i < p.end && (p.s[i] == ',' || p.wordAt(i, "against")) {
		word = "" // a name that is drawn, whatever it is
	}
	switch word {
	case "limit":
		p.advance()
		plot.Limits = append(plot.Limits, p.plotNames("behind `limit` stand names, as in `limit tau_d`")...)
	case "steps":
		p.steps(plot)
	case "checks":
		plot.Checks = true
		p.advance()
	case "plot":
		if p.advance(); p.tok == tName && p.here() == "checks" {
			plot.Checks = true
			p.advance()
			return
		}
		p.syntax(p.lastFrom, p.last, "a line of a plot does not start with `plot`", "leave the word out, or write `plot checks`")
	default:
		p.curves(plot)
	}
}

// curves reads `tau, sigma against d from 16 mm to 40 mm`, `steps 400` behind it too.
func (p *parser) curves(plot *Plot) {
	start := p.start
	const form = "as in `tau against d from 16 mm to 40 mm`"
	names := p.plotNames("a plot draws names against a name, " + form)
	if plot.Against != nil {
		p.syntax(start, p.last, "a plot has one horizontal axis; its curves stand in one line", "as in `tau, sigma against d from 16 mm to 40 mm`")
	}
	if !p.keyword("against", form) {
		return
	}
	if p.tok != tName {
		p.syntax(p.lastFrom, p.last, "behind `against` stands the name that is varied, "+form)
		return
	}
	plot.Curves, plot.Against = names, p.use()
	if !p.keyword("from", form) {
		return
	}
	p.stop = "to"
	plot.From = p.value()
	p.stop = ""
	if !p.keyword("to", form) {
		return
	}
	p.stop = "steps"
	plot.To = p.value()
	p.stop = ""
	if p.tok == tName && p.here() == "steps" {
		p.steps(plot) // also read here, and not only on a line of its own
	}
}

// keyword reads a word that has its meaning in a plot only.
func (p *parser) keyword(word, form string) bool {
	if p.tok == tName && p.here() == word {
		p.advance()
		return true
	}
	at := p.span(p.start, p.pos)
	if p.tok == tEnd {
		at = p.span(p.lastFrom, p.last)
	}
	p.fail(at, diag.Syntax, fmt.Sprintf("`%s` is missing here, %s", word, form))
	return false
}

// plotNames reads names separated by commas.
func (p *parser) plotNames(want string) []*Name {
	var names []*Name
	for {
		if p.tok != tName {
			at := p.span(p.start, p.pos)
			if p.tok == tEnd {
				at = p.span(p.lastFrom, p.last)
			}
			p.fail(at, diag.Syntax, want)
			return names
		}
		names = append(names, p.use())
		if p.tok != tComma {
			return names
		}
		p.advance()
	}
}

// steps reads `steps 400`.
func (p *parser) steps(plot *Plot) {
	p.advance()
	end := digitsEnd(p.s, p.start, p.end)
	n, err := strconv.Atoi(p.s[p.start:end])
	switch {
	case p.tok != tNumber || end < p.end && byteClass[p.s[end]]&blankByte == 0 || n == 0:
		at := p.span(p.start, max(p.pos, end))
		if p.tok == tEnd {
			at = p.span(p.lastFrom, p.last)
		}
		p.fail(at, diag.Syntax, "behind `steps` stands a whole number, as in `steps 400`")
		return
	case err != nil || n > maxSteps:
		p.fail(p.span(p.start, end), diag.BoundExceeded, fmt.Sprintf("a plot has at most %d steps", maxSteps))
		return
	}
	plot.Steps = n
	p.pos = end
	p.advance()
}

// figure reads `figure KIND arguments`; the arguments may go on in the block's
// lines, where a line's end stands for a comma.
func (p *parser) figure(b *Block, info Line) {
	f := b.Figure
	end := info.Start
	for end < info.End && (byteClass[p.s[end]]&nameByte != 0 || p.s[end] == '-') {
		end++
	}
	f.Kind, f.KindAt = p.s[info.Start:end], p.span(info.Start, end)
	if f.Kind == "" {
		p.report(diag.Error, f.KindAt, diag.Syntax, "the figure has no kind", "put it behind the word, as in `figure mohr sigma_x, sigma_y, tau_xy`")
	}
	p.segs = p.segs[:0]
	if rest := trimmed(p.s, end, info.End); rest.Start < rest.End {
		p.segs = append(p.segs, rest)
	}
	for _, line := range p.lines {
		if p.isRemark(line) {
			continue
		}
		open := 0
		seg, note := p.takeNote(line, &open)
		if note < line.End && !b.Note.isSet() {
			b.Note = p.noteAt(note, line.End)
		}
		if seg.Start < seg.End {
			p.segs = append(p.segs, seg)
		}
	}
	if len(p.segs) == 0 || f.Kind == "" {
		return
	}
	p.begin()
	f.Args = p.figureArgs()
	if p.finish(); p.failed {
		f.Args = nil
	}
	f.Slots = p.slots
}

func (p *parser) figureArgs() []Arg {
	var args []Arg
	for {
		seg := p.seg
		arg, ok := p.argument(args)
		if !ok {
			return nil
		}
		if arg.Over != nil {
			p.fail(arg.Over.At, diag.Syntax, "`over` stands only inside a reduction, as in `max(F over bolts)`")
		}
		args = append(args, arg)
		switch {
		case p.tok == tComma:
			p.advance()
			if p.tok == tEnd {
				p.syntax(p.lastFrom, p.last, "an argument is missing behind the comma")
				return nil
			}
		case p.tok == tEnd || p.tok == tFailed || p.seg == seg:
			return args
		}
	}
}
