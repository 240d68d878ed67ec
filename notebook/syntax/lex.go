package syntax

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"gusset/notebook/diag"
)

// token is the kind of a token. Its text is p.s[p.start:p.pos].
type token uint8

const (
	tEnd    token = iota // of the statement
	tFailed              // the statement cannot be read; all that follows is skipped
	tName
	tNumber // stands at its first byte; number reads it with its unit
	tText
	tSuper // a run of superscript figures
	tRoot
	tOpen
	tClose
	tOpenUnit
	tCloseUnit
	tComma
	tAssign
	tPlus
	tMinus
	tTimes
	tSlash
	tPower
	tLt
	tLe
	tGt
	tGe
	tEq
	tNe
	tIf
	tOtherwise
	tElse
	tAnd
	tOr
	tNot
	tAt
	tOver
	tFirst
	tOf
	tWith
	tWhere
	tCheck
	tNeeds
	tWarn
	tGives
)

// advance goes on to the next token.
func (p *parser) advance() {
	if p.tok == tFailed {
		return
	}
	p.prev, p.lastFrom, p.last = p.tok, p.start, p.pos
	i := p.skipBlanks(p.pos)
	for i >= p.end {
		if p.seg+1 >= len(p.segs) {
			p.tok, p.start, p.pos = tEnd, p.end, p.end
			return
		}
		p.seg++
		p.end = p.segs[p.seg].End
		i = p.skipBlanks(p.segs[p.seg].Start)
	}
	p.start = i
	c := p.s[i]
	switch {
	case byteClass[c]&letterByte != 0:
		p.word(i)
		return
	case byteClass[c]&digitByte != 0:
		p.tok, p.pos = tNumber, i+1
		return
	case c >= utf8.RuneSelf:
		p.foreign(i)
		return
	}
	if p.sign(i, c); p.tok == tComma {
		p.oneMore()
	}
}

// skipBlanks skips blanks within a line, those beyond ASCII too, which come
// along when text is pasted.
func (p *parser) skipBlanks(i int) int {
	for i < p.end {
		c := p.s[i]
		if byteClass[c]&blankByte != 0 {
			i++
			continue
		}
		if c < utf8.RuneSelf {
			break
		}
		r, size := utf8.DecodeRuneInString(p.s[i:p.end])
		if !unicode.Is(unicode.Zs, r) {
			break
		}
		i += size
	}
	return i
}

// word reads a name, dots included, or one of the reserved words.
func (p *parser) word(i int) {
	j := i + 1
	for j < p.end && byteClass[p.s[j]]&nameByte != 0 {
		j++
	}
	p.dots = false
	if j < p.end && (p.s[j] == '.' || p.s[j] >= utf8.RuneSelf) {
		j = dottedEnd(p.s, i, p.end)
		p.dots = strings.IndexByte(p.s[i:j], '.') >= 0
	}
	p.pos = j
	p.tok = tName
	if j-i <= len("otherwise") {
		p.tok = reserved(p.s[i:j])
	} else {
		p.holdName(i, j)
	}
}

// holdName reports a name that is too long.
func (p *parser) holdName(i, j int) {
	if j-i > maxName && utf8.RuneCountInString(p.s[i:j]) > maxName {
		p.fail(p.span(i, j), diag.BoundExceeded, fmt.Sprintf("a name is longer than the bound of %d characters", maxName))
	}
}

// sign reads a token that starts with an ASCII sign.
func (p *parser) sign(i int, c byte) {
	next := byte(0)
	if i+1 < p.end {
		next = p.s[i+1]
	}
	p.pos = i + 1
	switch c {
	case '(':
		p.tok = tOpen
	case ')':
		p.tok = tClose
	case '[':
		p.tok = tOpenUnit
	case ']':
		p.tok = tCloseUnit
	case ',':
		p.tok = tComma
	case '+':
		p.tok = tPlus
	case '-':
		p.tok = tMinus
	case '*':
		p.tok = tTimes
	case '/':
		p.tok = tSlash
	case '^':
		p.tok = tPower
	case '<':
		p.either(next, tLt, tLe)
	case '>':
		p.either(next, tGt, tGe)
	case '=':
		p.either(next, tAssign, tEq)
	case '!':
		p.either(next, tFailed, tNe)
	case '.':
		p.tok = tNumber
		if !isDigit(next) {
			p.tok = tFailed
		}
	case '"':
		p.text(i)
		return
	default:
		p.tok = tFailed
	}
	if p.tok == tFailed || slip(c, next) != "" {
		p.tok = tEnd
		p.strange(i)
	}
}

// slip returns what the author of a sign known from elsewhere meant, or "".
func slip(c, next byte) string {
	switch {
	case c == '*' && next == '*':
		return "^"
	case c == '<' && next == '>':
		return "!="
	case c == '=' && next == '<':
		return "<="
	case c == '=' && next == '>':
		return ">="
	case c == '/' && next == '/':
		return "#"
	}
	return ""
}

func (p *parser) either(next byte, plain, withEquals token) {
	p.tok = plain
	if next == '=' {
		p.tok, p.pos = withEquals, p.pos+1
	}
}

// text reads a quoted text.
func (p *parser) text(i int) {
	n := strings.IndexByte(p.s[i+1:p.end], '"')
	if n < 0 {
		p.syntax(i, p.end, "the quoted text is not closed", "close it with `\"`: write "+quoted(p.s[i:p.end]+`"`))
		return
	}
	p.tok, p.pos = tText, i+n+2
}

// foreign reads a token that starts beyond ASCII.
func (p *parser) foreign(i int) {
	r, size := utf8.DecodeRuneInString(p.s[i:p.end])
	p.pos = i + size
	switch r {
	case '×', '·', '⋅', '∙':
		p.tok = tTimes
	case '÷':
		p.tok = tSlash
	case '−':
		p.tok = tMinus
	case '≤':
		p.tok = tLe
	case '≥':
		p.tok = tGe
	case '≠':
		p.tok = tNe
	case '√':
		p.tok = tRoot
	default:
		switch {
		case isNameLetter(r):
			p.pos = dottedEnd(p.s, i, p.end)
			p.tok, p.dots = tName, strings.IndexByte(p.s[i:p.pos], '.') >= 0
			p.holdName(i, p.pos)
		case superFigure(r) != 0:
			p.pos = superEnd(p.s, i, p.end)
			p.tok = tSuper
		default:
			p.strange(i)
		}
	}
}

// superFigure returns the plain spelling of a superscript figure or minus, or 0.
func superFigure(r rune) byte {
	switch r {
	case '¹':
		return '1'
	case '²':
		return '2'
	case '³':
		return '3'
	case '⁻':
		return '-'
	case '⁰', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹':
		return byte('0' + r - '⁰')
	}
	return 0
}

// superEnd returns the end of a run of superscript figures at i.
func superEnd(s string, i, end int) int {
	for i < end {
		r, size := utf8.DecodeRuneInString(s[i:end])
		if superFigure(r) == 0 {
			break
		}
		i += size
	}
	return i
}

// text of the current token, and of the one before.
func (p *parser) here() string   { return p.s[p.start:p.pos] }
func (p *parser) before() string { return p.s[p.lastFrom:p.last] }
