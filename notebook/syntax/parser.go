// Package syntax reads the notation of calc files: the content of a fence
// becomes a tree whose every node knows its place in the file.
//
//	tau [MPa] = P/(2*A)   # Average shear stress [EN 1993-1-8]
//
// is a Definition with the declared unit MPa, one branch whose value is
// (/ P (paren (* 2 A))), and a note with its source. ParseBlock reads one
// fence; what it cannot read stands in the tree as a BadStmt with a diagnostic
// beside it, and the next statement is read as if nothing had happened.
//
// The parser works in two steps over each statement. readStatement finds the
// lines that belong to it by counting brackets and looking at the last sign of
// each line, and takes the notes off. The expression parser then runs over
// those segments by precedence, one token at a time. The extent is fixed first
// so that a mistake inside a statement never changes where the next one starts.
package syntax

import (
	"strings"

	"gusset/notebook/diag"
	"gusset/units"
)

// Line is one physical line of a fence's content as byte offsets into the
// source, without its line ending. Lines of a fence inside a quote or a list are not
// contiguous in the source.
type Line struct{ Start, End int }

// The bounds on what one statement may hold. Depth keeps the recursion of this and the
// later phases shallow. Length bounds the height of a tree that grows to the left (a sum of many terms).
const (
	maxDepth     = 100
	maxOperators = 10_000
)

// parser reads one block. Offsets within it count from off, the start of the
// piece of the source that s is a copy of.
type parser struct {
	src   *diag.Source
	s     string
	off   int
	kind  BlockKind
	lines []Line // relative to off
	next  int    // the next line to read
	diags []diag.Diagnostic

	// The statement being read.
	segs   []Line // its lines without blanks around and notes
	note   Note
	seg    int
	pos    int // behind the current token
	end    int // of the current segment
	failed bool
	slots  int
	depth  int
	ops    int
	cell   bool   // in a table's cell: a fraction needs no unit
	stop   string // a word that ends an expression beside the reserved ones

	tok      token
	start    int // of the current token
	dots     bool
	prev     token
	last     int // the end of the token before
	lastFrom int // its start

	*slabs
}

type cachedUnit struct {
	text string
	unit units.Unit
}

// newParser returns a parser over the smallest piece of the source that holds
// all the given ranges.
func newParser(src *diag.Source, at diag.Span, shared *slabs) *parser {
	lo, hi := max(at.Start, 0), min(at.End, len(src.Text))
	if lo > hi {
		lo = hi
	}
	return &parser{src: src, s: string(src.Text[lo:hi]), off: lo, slabs: shared}
}

// span turns offsets within the parser's piece into a range of the source.
func (p *parser) span(start, end int) diag.Span {
	return diag.Span{Start: start + p.off, End: end + p.off}
}

// within is span backwards.
func (p *parser) within(at diag.Span) (start, end int) {
	start = min(max(at.Start-p.off, 0), len(p.s))
	return start, min(max(at.End-p.off, start), len(p.s))
}

// whole makes one range the statement to read.
func (p *parser) whole(start, end int) {
	p.segs = append(p.segs[:0], trimmed(p.s, start, end))
	p.begin()
}

// begin starts the reading of the statement in segs.
func (p *parser) begin() {
	p.failed, p.depth, p.ops = false, 0, 0
	p.seg, p.pos, p.end = 0, p.segs[0].Start, p.segs[0].End
	p.tok, p.start = tEnd, p.pos
	p.advance()
}

// bounds returns the range of the statement being read.
func (p *parser) bounds() diag.Span {
	return p.span(p.segs[0].Start, p.segs[len(p.segs)-1].End)
}

func trimmed(s string, start, end int) Line {
	for start < end && byteClass[s[start]]&blankByte != 0 {
		start++
	}
	for end > start && byteClass[s[end-1]]&blankByte != 0 {
		end--
	}
	return Line{start, end}
}

// report adds a diagnostic without ending the statement.
func (p *parser) report(severity diag.Severity, at diag.Span, id, message string, hints ...string) {
	if severity == diag.Error {
		p.failed = true
	}
	p.diags = append(p.diags, diag.Diagnostic{
		Severity: severity, ID: id, Message: message, Hints: hints, Source: p.src, Span: at,
	})
}

// fail reports why the statement cannot be read and skips what is left of it.
// Only the first reason in a statement is reported.
func (p *parser) fail(at diag.Span, id, message string, hints ...string) {
	if p.tok != tFailed {
		p.report(diag.Error, at, id, message, hints...)
	}
	p.tok = tFailed
}

// syntax is fail with the id of most mistakes, at a range of the parser's piece.
func (p *parser) syntax(start, end int, message string, hints ...string) {
	p.fail(p.span(start, end), diag.Syntax, message, hints...)
}

// bad is the node for what could not be read.
func (p *parser) bad() Expr { return &Bad{At: p.span(p.start, p.start)} }

// quoted puts the user's words into backticks, cut where they are long.
func quoted(s string) string {
	if strings.IndexByte(s, '`') >= 0 {
		s = strings.ReplaceAll(s, "`", "'")
	}
	const most = 60
	if len(s) > most {
		cut := most
		for cut > 0 && s[cut]&0xC0 == 0x80 {
			cut--
		}
		s = s[:cut] + "…"
	}
	return "`" + strings.ToValidUTF8(s, "\uFFFD") + "`"
}
