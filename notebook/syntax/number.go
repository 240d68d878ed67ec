package syntax

import (
	"fmt"
	"strings"
	"unicode/utf8"

	"gusset/notebook/diag"
	"gusset/units"
)

// number reads a literal with its unit, from its first figure on: a plain
// number, a fraction or a mixed number before a unit, or a falling compound.
func (p *parser) number() Expr {
	start, seg := p.start, p.seg
	pieces := p.pieces.Take(1, p.size)
	end, ok := p.piece(&pieces[0], start, true)
	if !ok {
		return p.bad()
	}
	n := p.numbers.One(p.size)
	n.Pieces = pieces
	if pieces[0].HasUnit {
		if end = p.compound(n, start, end); end < 0 {
			return p.bad()
		}
	}
	n.At = p.span(start, end)
	p.pos = end
	p.advance()
	if p.tok == tNumber && !pieces[0].HasUnit && p.seg == seg {
		p.numberBesideNumber(start, end)
	}
	return n
}

// compound reads the further pieces of `12 ft 6 1/2 in`. It returns the
// literal's end, or -1 after a mistake.
func (p *parser) compound(n *Number, start, end int) int {
	for {
		i := p.skipBlanks(end)
		if i >= p.end || i == end || !isDigit(p.s[i]) && !(p.s[i] == '.' && i+1 < p.end && isDigit(p.s[i+1])) {
			return p.noMinus(n, start, end)
		}
		var next Piece
		last := n.Pieces[len(n.Pieces)-1]
		from := end
		var ok bool
		if end, ok = p.piece(&next, i, false); !ok {
			return -1
		}
		switch {
		case !next.HasUnit:
			p.syntax(start, end, fmt.Sprintf("the unit of %s is missing", quoted(p.s[i:end])), p.partHint(start, from, i, end, last.Unit))
			return -1
		case next.Unit.Dim() != last.Unit.Dim() || last.Unit.IsPoint():
			p.syntax(start, end, fmt.Sprintf("%s and %s stand side by side and are no parts of one quantity", quoted(p.s[start:from]), quoted(p.s[i:end])),
				"for a product write "+quoted(p.s[start:from]+" * "+p.s[i:end]))
			return -1
		case next.Unit.ToSI(1) >= last.Unit.ToSI(1):
			p.syntax(start, end, fmt.Sprintf("the parts of a quantity fall from the larger unit to the smaller, as in `12 ft 6 in`; `%s` is not smaller than `%s`", next.Unit, last.Unit),
				"for a sum write "+quoted(p.s[start:from]+" + "+p.s[i:end]))
			return -1
		case strings.ContainsAny(last.Figures, "./eE"):
			p.syntax(start, end, fmt.Sprintf("only the last part of a quantity has decimals or a fraction, not %s", quoted(p.s[start:from])),
				"for a sum write "+quoted(p.s[start:from]+" + "+p.s[i:end]))
			return -1
		}
		n.Pieces = append(n.Pieces, next)
	}
}

// partHint shows what the last part of a compound may be.
func (p *parser) partHint(start, from, i, end int, last units.Unit) string {
	smaller := map[string]string{"ft": "in", "yd": "ft", "m": "mm", "deg": "arcmin", "°": "arcmin", "arcmin": "arcsec", "h": "min", "min": "s"}[last.String()]
	if smaller == "" {
		return "for a product write " + quoted(p.s[start:from]+" * "+p.s[i:end])
	}
	return "write " + quoted(p.s[start:end]+" "+smaller)
}

// noMinus refuses `12 ft-6 in`, which an engineer reads as one length and the
// rules of arithmetic as a difference. A minus with blanks round it is plain.
func (p *parser) noMinus(n *Number, start, end int) int {
	last := n.Pieces[len(n.Pieces)-1]
	if last.Unit.String() != "ft" {
		return end
	}
	i := p.skipBlanks(end)
	if i >= p.end || p.s[i] != '-' || i+1 >= p.end || !isDigit(p.s[i+1]) {
		return end
	}
	j := figureRunEnd(p.s, i+1, p.end)
	k := p.skipBlanks(j)
	e := nameEnd(p.s, k, p.end)
	if p.s[k:e] != "in" {
		return end
	}
	feet, inches := p.s[start:end], p.s[i+1:e]
	p.syntax(start, e, fmt.Sprintf("%s may be one length or a difference", quoted(p.s[start:e])),
		fmt.Sprintf("for the length write %s, for the difference %s", quoted(feet+" "+inches), quoted(feet+" - "+inches)))
	return -1
}

// figureRunEnd returns the end of figures with a fraction behind: `6`, `6 1/2`, `1/2`.
func figureRunEnd(s string, i, end int) int {
	j, _ := figuresEnd(s, i, end)
	k := j
	for k < end && s[k] == ' ' {
		k++
	}
	for _, from := range [2]int{j, k} { // the slash of `1/2`, or `1/2` behind a blank
		m := from
		if from > j {
			m = digitsEnd(s, from, end)
		}
		if m < end && s[m] == '/' && m > i && m+1 < end && isDigit(s[m+1]) {
			return digitsEnd(s, m+1, end)
		}
	}
	return j
}

// piece reads figures and the unit behind them. It returns the end of both;
// ok is false after a mistake. first tells that the literal starts here.
func (p *parser) piece(piece *Piece, start int, first bool) (end int, ok bool) {
	i, whole := figuresEnd(p.s, start, p.end)
	if whole {
		j, ok := p.fraction(start, i, first && (p.prev == tSlash || p.prev == tPower))
		if !ok {
			return 0, false
		}
		i = j
	}
	if !p.checkFigures(start, i, whole) {
		return 0, false
	}
	piece.Figures = p.s[start:i]
	piece.At = p.span(start, i)
	u := p.skipBlanks(i)
	if !p.unitStarts(u, u == i) {
		return i, true
	}
	unit, end, ok := p.unit(start, u)
	if !ok {
		return 0, false
	}
	piece.Unit, piece.HasUnit, piece.Touch = unit, true, u == i
	piece.UnitAt = p.span(u, end)
	return end, true
}

// checkFigures reports what is wrong with figures or stands wrongly behind them.
func (p *parser) checkFigures(start, i int, whole bool) bool {
	text := p.s[start:i]
	if i < p.end {
		switch c := p.s[i]; {
		case c == ',' && whole && groupEnd(p.s, i, p.end) > 0:
			p.grouping(start, i)
			return false
		case c == '.' && !(i+1 < p.end && byteClass[p.s[i+1]]&letterByte != 0):
			p.pointBehind(start, i)
			return false
		case c == '\'' || c == '"':
			p.feetAndInches(start, i)
			return false
		case (c == 'e' || c == 'E') && strings.HasPrefix(p.s[i+1:p.end], "−") && digitsEnd(p.s, i+1+len("−"), p.end) > i+1+len("−"):
			e := digitsEnd(p.s, i+1+len("−"), p.end)
			p.syntax(start, e, "the minus of an exponent is written `-`", "write "+quoted(strings.Replace(p.s[start:e], "−", "-", 1)))
			return false
		case c >= utf8.RuneSelf && p.lengthMark(start, i):
			return false
		}
	}
	if i-start <= 15 && strings.IndexByte(text, 'e') < 0 && strings.IndexByte(text, 'E') < 0 {
		return true
	}
	for field := range strings.FieldsFuncSeq(text, func(r rune) bool { return r == ' ' || r == '/' || r == '\t' }) {
		switch checkFigures(field) {
		case figuresInfinite:
			p.fail(p.span(start, i), diag.NotANumber, fmt.Sprintf("%s is larger than any number that can be computed with (about 1.8e308)", quoted(text)))
			return false
		case figuresVanish:
			p.fail(p.span(start, i), diag.NotANumber, fmt.Sprintf("%s is smaller than any number that can be computed with (about 5e-324)", quoted(text)))
			return false
		case figuresLong:
			p.fail(p.span(start, i), diag.BoundExceeded, fmt.Sprintf("%s is over the bound of %d figures, or an exponent of %d", quoted(text), maxFigures, maxExponent))
			return false
		}
	}
	return true
}

// fraction extends whole figures by a fraction: `3/4` or `1 3/8`, directly
// before a unit. It returns the end of the figures. bound tells that the whole
// figures belong to a `/` or `^` before them, so that no fraction starts here.
func (p *parser) fraction(start, i int, bound bool) (int, bool) {
	if i < p.end && p.s[i] == '/' {
		j := p.fractionTail(i)
		if j < 0 || bound {
			return i, true
		}
		return j, p.hasDenominator(start, i, j)
	}
	if i < p.end && p.s[i] == '-' && !bound && p.mixedByHyphen(start, i) {
		return 0, false
	}
	k := p.skipBlanks(i)
	if k == i || k >= p.end || !isDigit(p.s[k]) {
		return i, true
	}
	m := digitsEnd(p.s, k, p.end)
	if m >= p.end || p.s[m] != '/' || m+1 >= p.end || !isDigit(p.s[m+1]) {
		return i, true
	}
	j := p.fractionTail(m)
	if j < 0 {
		e := digitsEnd(p.s, m+1, p.end)
		sum := p.s[start:i] + " + " + p.s[k:e]
		p.syntax(start, e, fmt.Sprintf("the mixed number %s stands directly before a unit only", quoted(p.s[start:e])), "write "+quoted("("+sum+")"))
		return 0, false
	}
	if bound {
		e := unitNameEnd(p.s, p.skipBlanks(j), p.end)
		p.syntax(start, e, fmt.Sprintf("behind %s a mixed number wants brackets", quoted(p.before())), "write "+quoted("("+p.s[start:e]+")"))
		return 0, false
	}
	return j, p.hasDenominator(start, m, j)
}

// mixedByHyphen refuses `6-1/2 in`, as drawings write a mixed number; a number
// less a length is nothing.
func (p *parser) mixedByHyphen(start, hyphen int) bool {
	slash := digitsEnd(p.s, hyphen+1, p.end)
	if slash == hyphen+1 || slash >= p.end || p.s[slash] != '/' {
		return false
	}
	j := p.fractionTail(slash)
	if j < 0 {
		return false
	}
	e := unitNameEnd(p.s, p.skipBlanks(j), p.end)
	text := p.s[start:hyphen] + " " + p.s[hyphen+1:e]
	p.syntax(start, e, "a mixed number is written with a blank", "write "+quoted(text))
	return true
}

// hasDenominator refuses `3/0 in`.
func (p *parser) hasDenominator(start, slash, end int) bool {
	if strings.Trim(p.s[slash+1:end], "0_") != "" {
		return true
	}
	p.fail(p.span(start, end), diag.NotANumber, fmt.Sprintf("the fraction %s divides by zero", quoted(p.s[start:end])))
	return false
}

// fractionTail returns the end of `/4` at the slash i, where a unit follows
// (or in a table's cell nothing), else -1.
func (p *parser) fractionTail(i int) int {
	if i+1 >= p.end || !isDigit(p.s[i+1]) {
		return -1
	}
	j := digitsEnd(p.s, i+1, p.end)
	if full, whole := figuresEnd(p.s, i+1, p.end); full != j || !whole {
		return -1
	}
	u := p.skipBlanks(j)
	if u >= p.end && p.cell || p.unitStarts(u, u == j) || j < p.end && (p.s[j] == '"' || p.s[j] == '\'') {
		return j
	}
	return -1
}

// unitStarts tells whether what stands at i, behind figures, has to be a unit:
// any name but a reserved word, `%` and the like, or the `1/K` of a reciprocal.
func (p *parser) unitStarts(i int, touch bool) bool {
	if i >= p.end {
		return false
	}
	c := p.s[i]
	switch {
	case byteClass[c]&letterByte != 0:
		j := nameEnd(p.s, i, p.end)
		return (j-i > len("otherwise") || reserved(p.s[i:j]) == tName) && (p.stop == "" || p.s[i:j] != p.stop)
	case c == '%':
		return true
	case c == '1':
		if touch || i+2 >= p.end || p.s[i+1] != '/' {
			return false
		}
		return p.s[i+2] == '(' && p.unitBracket(i+2) > 0 || unitNameEnd(p.s, i+2, p.end) > i+2 && !isDigit(p.s[i+2])
	case c < utf8.RuneSelf:
		return false
	}
	r, _ := utf8.DecodeRuneInString(p.s[i:p.end])
	return isNameLetter(r) || strings.ContainsRune("°º‰", r)
}
