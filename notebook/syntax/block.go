package syntax

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
)

// blockKind returns the kind that an info string's first word names.
func blockKind(word string) (BlockKind, bool) {
	for k := CalcBlock; k <= FigureBlock; k++ {
		if word == k.String() {
			return k, true
		}
	}
	return 0, false
}

// firstWord returns the end of the word that an info string starts with.
func firstWord(s string) (start, end int) {
	l := trimmed(s, 0, len(s))
	end = l.Start
	for end < l.End && byteClass[s[end]]&blankByte == 0 && s[end] != '#' {
		end++
	}
	return l.Start, end
}

// IsOurs tells whether an info string opens a fence of ours: its first word is
// the name of a kind of block.
func IsOurs(info string) bool {
	start, end := firstWord(info)
	_, ok := blockKind(info[start:end])
	return ok
}

// Meant is the kind of block that an info string names in other capitals, such
// as Calc, with the part of the string that does so; "" where it names none.
func Meant(info string) (kind string, at diag.Span) {
	start, end := firstWord(info)
	word := strings.ToLower(info[start:end])
	if _, ok := blockKind(word); !ok || word == info[start:end] {
		return "", diag.Span{}
	}
	return word, diag.Span{Start: start, End: end}
}

// Reader reads the fences of one source.
type Reader struct {
	src   *diag.Source
	slabs *slabs
}

// NewReader returns a reader of a source's fences, of which some length is to be read.
func NewReader(src *diag.Source, length int) *Reader {
	return &Reader{src: src, slabs: newSlabs(length)}
}

// Block reads one fence. info spans the info string in the opening line,
// at the whole fence. A tree always comes back.
func (r *Reader) Block(info, at diag.Span, lines []Line) (*Block, []diag.Diagnostic) {
	src := r.src
	bounds := at
	bounds.Start, bounds.End = min(at.Start, info.Start), max(at.End, info.End)
	for _, l := range lines {
		bounds.Start, bounds.End = min(bounds.Start, l.Start), max(bounds.End, l.End)
	}
	p := newParser(src, bounds, r.slabs)
	p.lines = make([]Line, len(lines))
	for i, l := range lines {
		p.lines[i] = Line{l.Start - p.off, l.End - p.off}
	}
	start, end := p.within(info)
	kindStart, kindEnd := firstWord(p.s[start:end])
	b := &Block{At: at}
	b.Kind, _ = blockKind(p.s[start+kindStart : start+kindEnd])
	p.kind = b.Kind
	rest := Line{start + kindEnd, end}
	brackets := 0
	seg, note := p.takeNote(rest, &brackets)
	if note < rest.End {
		b.Note = p.noteAt(note, rest.End)
	}
	switch b.Kind {
	case CalcBlock:
		p.flags(b, seg, true)
		b.Stmts = p.statements()
	case HelperBlock:
		b.Helper = &Helper{At: at, Note: b.Note, Source: src, Name: p.blockName(seg, "helper", "direct_shear")}
		p.helper(b.Helper)
		if b.Helper.Gives == nil && b.Helper.Name != nil && len(p.diags) == 0 {
			p.report(diag.Error, b.Helper.Name.At, diag.Syntax,
				fmt.Sprintf("the helper %s gives no result", quoted(b.Helper.Name.Text)), "name its results in a last line, as in `gives tau`")
		}
	case ScheduleBlock, CasesBlock:
		b.Table = &Table{At: at}
		p.tableHead(b, seg)
		p.table(b.Table)
	case PlotBlock:
		b.Plot = &Plot{At: at, Note: b.Note}
		p.plot(b.Plot, seg)
	case FigureBlock:
		b.Figure = &Figure{At: at}
		p.figure(b, seg)
	}
	return b, p.diags
}

// words calls f for each word between two offsets: a name, a file's name, or
// anything else up to a blank; a quoted text is one word.
func (p *parser) words(seg Line, f func(start, end int)) {
	for i := blanksEnd(p.s, seg.Start); i < seg.End; i = blanksEnd(p.s, i) {
		j := i + 1
		if p.s[i] == '"' {
			if n := strings.IndexByte(p.s[j:seg.End], '"'); n >= 0 {
				f(i, j+n+1)
				i = j + n + 1
				continue
			}
		}
		for j < seg.End && byteClass[p.s[j]]&blankByte == 0 {
			j++
		}
		f(i, j)
		i = j
	}
}

// flags reads the words `brief` and `full` behind a kind of block.
func (p *parser) flags(b *Block, seg Line, brief bool) {
	p.words(seg, func(start, end int) {
		switch word := p.s[start:end]; {
		case word == "brief" && brief:
			b.Brief = true
		case word == "full":
			b.Full = true
		default:
			p.report(diag.Error, p.span(start, end), diag.Syntax,
				fmt.Sprintf("%s says nothing behind `calc`", quoted(word)), "`calc` takes `brief`, which leaves the formulas out, and `full`, which cuts no rows")
		}
	})
}

// blockName reads the name behind a kind of block, which has to be all there is.
func (p *parser) blockName(seg Line, kind, example string) *Name {
	if seg.Start >= seg.End {
		p.report(diag.Error, p.span(seg.Start, seg.Start), diag.Syntax, fmt.Sprintf("the %s has no name", kind),
			fmt.Sprintf("put it behind the word, as in `%s %s`", kind, example))
		return nil
	}
	p.segs = append(p.segs[:0], seg)
	p.begin()
	name := p.plainName("a " + kind + "'s name")
	if name != nil && p.tok != tEnd {
		p.syntax(p.start, p.pos, fmt.Sprintf("%s is out of place behind the name of a %s", quoted(p.here()), kind))
	}
	return name
}

// plainName reads a name without dots. It returns nil after a mistake; what
// says what was to be read.
func (p *parser) plainName(what string) *Name {
	switch {
	case p.tok == tName && !p.dots:
		return p.name()
	case p.tok == tName:
		p.syntax(p.start, p.pos, fmt.Sprintf("%s has no dots, unlike %s", what, quoted(p.here())))
	case p.tok >= tIf:
		p.syntax(p.start, p.pos, fmt.Sprintf("%s is a word of the notation and cannot be %s", quoted(p.here()), what))
	case p.tok == tNumber:
		e := p.operandEnd(p.start)
		p.syntax(p.start, e, fmt.Sprintf("%s starts with a letter, unlike %s", what, quoted(p.s[p.start:e])))
	case p.tok != tFailed:
		p.syntax(p.start, p.pos, fmt.Sprintf("%s is a name of letters, figures and `_`, not %s", what, quoted(p.here())))
	}
	return nil
}

// ParseExpr reads one whole expression, a value or a condition.
func ParseExpr(src *diag.Source, at diag.Span) (Expr, []diag.Diagnostic) {
	p := newParser(src, at, newSlabs(at.End-at.Start))
	p.whole(0, len(p.s))
	x := p.expression(levelOr)
	if p.finish(); p.failed {
		x = &Bad{At: at}
	}
	return x, p.diags
}
