package syntax

import (
	"fmt"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"

	"golang.org/x/text/unicode/norm"

	"gusset/notebook/diag"
	"gusset/units"
)

// What the messages show as corrections replaces the range that is underlined,
// so that a correction pasted over it reads.

// noValue reports a token that stands where an operand belongs.
func (p *parser) noValue() {
	here := quoted(p.here())
	switch {
	case p.tok == tFailed:
	case p.tok == tEnd && p.prev == tEnd:
		p.syntax(p.start, p.start, "a value is missing")
	case p.tok == tEnd:
		p.syntax(p.lastFrom, p.last, fmt.Sprintf("a value is missing behind %s", quoted(p.before())))
	case p.tok == tOpenUnit:
		p.syntax(p.start, p.pos, "square brackets hold the unit that a name is declared in; values stand in round ones")
	case p.tok == tSuper:
		p.syntax(p.start, p.pos, fmt.Sprintf("the power %s has nothing before it", here))
	case p.tok == tIf && p.prev == tAssign:
		p.syntax(p.start, p.pos, "a choice has its value before the condition", "as in `k = 0.85 if t <= 25 mm`, further branches on the lines below")
	case p.tok == tFirst && strings.HasPrefix(strings.TrimLeft(p.s[p.pos:], " \t"), "of"):
		p.syntax(p.start, p.pos, "`first of … with …` is the whole right side of a definition, outside all brackets", "define the choice on a line of its own, and use its name here")
	case p.tok >= tIf:
		p.syntax(p.start, p.pos, fmt.Sprintf("a value is missing before %s, which is a word of the notation and cannot be a name", here))
	case p.prev == tEnd:
		p.syntax(p.start, p.pos, fmt.Sprintf("a value is missing before %s", here))
	default:
		p.syntax(p.start, p.pos, fmt.Sprintf("a value is missing between %s and %s", quoted(p.before()), here))
	}
}

// leftover reports a token behind an expression that cannot go on with it.
func (p *parser) leftover() {
	here := quoted(p.here())
	switch p.tok {
	case tEnd, tFailed:
	case tName, tNumber, tOpen, tText, tRoot:
		p.sideBySide()
	case tClose:
		p.syntax(p.start, p.pos, "the bracket `)` closes none")
	case tCloseUnit:
		p.syntax(p.start, p.pos, "the bracket `]` closes none")
	case tOpenUnit:
		p.strayBrackets()
	case tComma:
		p.strayComma()
	case tAssign:
		p.syntax(p.start, p.pos, "a second `=`: a line defines one name", "a comparison is written `==`")
	case tElse:
		p.syntax(p.start, p.pos, "the last branch is marked by `otherwise`", "write `otherwise`")
	case tWith, tFirst, tOf:
		p.syntax(p.start, p.pos, fmt.Sprintf("%s belongs to `first of … with …`, which is the whole right side of a definition", here))
	case tOver:
		p.syntax(p.start, p.pos, "`over` stands only inside a reduction, as in `max(F over bolts)`")
	case tIf:
		p.syntax(p.start, p.pos, "`if` stands only behind a branch of a definition or behind a check, outside all brackets")
	case tOtherwise:
		p.syntax(p.start, p.pos, "`otherwise` stands only behind the last branch of a definition, outside all brackets")
	case tWhere:
		p.syntax(p.start, p.pos, "`where` stands only behind the formula of a definition")
	default:
		p.syntax(p.start, p.pos, fmt.Sprintf("%s is out of place here", here))
	}
}

// strayBrackets reports square brackets behind a value: a unit, a row, or a
// source without the `#` before it.
func (p *parser) strayBrackets() {
	end := strings.IndexByte(p.s[p.start:p.end], ']')
	if end < 0 {
		p.syntax(p.start, p.pos, "the bracket `[` is not closed")
		return
	}
	end += p.start + 1
	inside := p.s[p.pos : end-1]
	_, err := units.Parse(strings.TrimSpace(inside))
	switch {
	case p.prev == tName && p.last == p.start:
		p.syntax(p.start, end, "square brackets pick no row; a row is picked by its mark, as in `bolts.x at \"B1\"`")
	case err == nil:
		p.syntax(p.start, end, "a declared unit in square brackets stands behind the name that is defined, as in `tau [MPa] = …`")
	default:
		p.syntax(p.start, end, "a source in square brackets stands in the note, behind `#`", "write "+quoted("# "+p.s[p.start:end]))
	}
}

// strayComma reports a comma outside a list, or a decimal comma.
func (p *parser) strayComma() {
	if p.prev == tNumber && p.last == p.start && strings.Trim(p.before(), "0123456789_") == "" && p.pos < p.end && isDigit(p.s[p.pos]) {
		e := digitsEnd(p.s, p.pos, p.end)
		p.syntax(p.lastFrom, e, "a comma separates arguments; decimals stand behind a point",
			"write "+quoted(p.s[p.lastFrom:p.last]+"."+p.s[p.pos:e]))
		return
	}
	p.syntax(p.start, p.pos, "a comma separates the arguments of a call; here there is none")
}

// sideBySide reports an operand right behind another.
func (p *parser) sideBySide() {
	from, end := p.operandStart(), p.operandEnd(p.start)
	left, right := p.s[from:p.last], p.s[p.start:end]
	if p.last < p.segs[p.seg].Start {
		p.syntax(p.start, end, fmt.Sprintf("%s stands behind %s without an operator; a bracket above may not be closed", quoted(right), quoted(left)))
		return
	}
	switch {
	case p.tok == tName && p.prev == tNumber && p.unitInParts(from):
		return
	case p.prev == tName && isFunction(left) && right != "(":
		if p.tok == tOpen {
			right = right[1 : len(right)-1]
		}
		if start := p.start; p.tok == tNumber { // its unit belongs to it
			if p.number(); p.failed {
				return
			}
			end = p.last
			right = p.s[start:end]
		}
		p.syntax(from, end, fmt.Sprintf("the arguments of %s stand in brackets", quoted(left)), "write "+quoted(left+"("+right+")"))
		return
	}
	if p.tok == tName && units.IsUnitName(p.here()) && p.prev != tNumber {
		p.syntax(p.start, end, fmt.Sprintf("a unit stands directly behind a number only, and %s is none", quoted(left)),
			fmt.Sprintf("a product is written with `*`; the unit of a result is declared behind its name, as in `x [%s] = …`", p.here()))
		return
	}
	if p.tok == tOpen && p.prev == tNumber && p.unitBracket(p.start) == end && isDigit(left[len(left)-1]) {
		p.syntax(from, end, "a unit stands behind its number without brackets", "write "+quoted(left+" "+right[1:len(right)-1]))
		return
	}
	if right == "mod" {
		if next := p.skipBlanks(end); next < p.end {
			end := p.operandEnd(next)
			by := p.s[next:end]
			p.syntax(from, end, "there is no operator for a remainder", "write "+quoted(fmt.Sprintf("%s - %s*floor(%s/%s)", left, by, left, by)))
			return
		}
	}
	if p.prev == tText || p.tok == tText {
		p.syntax(from, end, fmt.Sprintf("%s and %s stand side by side without an operator", quoted(left), quoted(right)),
			"a text has no arithmetic, ends at the next quote and holds none itself")
		return
	}
	times := "*"
	if p.prev == tNumber && !isDigit(left[len(left)-1]) {
		times = " * " // tight, it might be read as part of the unit
	}
	p.syntax(from, end, fmt.Sprintf("%s and %s stand side by side without an operator", quoted(left), quoted(right)),
		"for a product write "+quoted(left+times+right))
}

// unitInParts reports a unit with a blank inside: `5 kN m`, `20 deg C`. The
// literal starts at from.
func (p *parser) unitInParts(from int) bool {
	literal, name := p.s[from:p.last], p.here()
	if stem := strings.TrimRight(literal, "°"); len(stem) < len(literal) || strings.HasSuffix(literal, "deg") {
		if name == "C" || name == "F" {
			p.fail(p.span(from, p.pos), diag.WrongUnitSpelling, "a unit is written without blanks", "write "+quoted(literal+name))
			return true
		}
	}
	if !units.IsUnitName(name) {
		return false
	}
	p.fail(p.span(from, p.pos), diag.WrongUnitSpelling, "a unit is written without blanks, its parts joined by `*`", "write "+quoted(literal+"*"+name))
	return true
}

// operandStart returns the start of the operand that the token before ended.
func (p *parser) operandStart() int {
	i := p.lastFrom
	if p.prev != tClose {
		return i
	}
	for open := 0; i >= p.segs[p.seg].Start; i-- {
		switch p.s[i] {
		case ')':
			open++
		case '(':
			open--
		}
		if open == 0 {
			for i > p.segs[p.seg].Start && (byteClass[p.s[i-1]]&nameByte != 0 || p.s[i-1] == '.') {
				i--
			}
			return i
		}
	}
	return p.lastFrom
}

// operandEnd returns the end of the operand that starts at i, brackets behind
// it included.
func (p *parser) operandEnd(i int) int {
	for i < p.end && (byteClass[p.s[i]]&nameByte != 0 || p.s[i] == '.' || p.s[i] == '-' && i+1 < p.end && isDigit(p.s[i+1])) {
		i++
	}
	switch {
	case i < p.end && p.s[i] >= utf8.RuneSelf:
		_, size := utf8.DecodeRuneInString(p.s[i:p.end])
		return p.operandEnd(i + size)
	case i < p.end && p.s[i] == '"':
		if n := strings.IndexByte(p.s[i+1:p.end], '"'); n >= 0 {
			return i + n + 2
		}
	case i < p.end && p.s[i] == '(':
		open := 0
		for j := i; j < p.end; j++ {
			switch p.s[j] {
			case '(':
				open++
			case ')':
				open--
			}
			if open == 0 {
				return j + 1
			}
		}
		return p.end
	}
	return i
}

// noUnit reports the name between i and j that stands behind figures and is no
// unit. lit and u are the starts of the literal and of its unit.
func (p *parser) noUnit(lit, u, i, j int) {
	name := p.s[i:j]
	figures := strings.TrimRight(p.s[lit:u], " \t")
	touch := len(figures) == u-lit
	_, err := units.Parse(name)
	fault, _ := err.(*units.ParseError)
	single := utf8.RuneCountInString(name) == 1
	product := "for a product write " + quoted(figures+"*"+p.s[u:p.operandEnd(u)])
	if strings.Contains(strings.TrimSpace(figures), " ") || strings.Contains(figures, "/") {
		product = "for a product write " + quoted("("+figures+")*"+p.s[u:p.operandEnd(u)])
		if strings.Contains(figures, " ") {
			product = "a mixed number stands directly before a unit only"
		}
	}
	if p.timesOrPower(lit, u, j, name) {
		return
	}
	switch {
	case fault == nil: // the name is a unit of a dotted name or a call, which unit never sends here
		p.syntax(lit, j, fmt.Sprintf("%s is no literal", quoted(p.s[lit:j])))
	case fault.ID == diag.WrongUnitSpelling && !single:
		p.unitFault(i, name, err)
	case fault.ID == diag.WrongUnitSpelling && !touch:
		p.fail(p.span(lit, p.operandEnd(u)), fault.ID, fault.Message, "for the unit write "+quoted(p.s[lit:i]+fault.Fix), product)
	default:
		hints := []string{product}
		id := diag.UnknownUnit
		if near := units.Suggest(name); near != "" && looksLikeUnit(name) {
			hints = []string{"did you mean " + quoted(p.s[lit:i]+near) + "?", product}
		} else if touch {
			id = diag.AmbiguousUnit
		}
		p.fail(p.span(lit, p.operandEnd(u)), id, fmt.Sprintf("a name directly behind a number is a unit, and %s is none", quoted(name)), hints...)
	}
}

// timesOrPower reports `2 x 3`, `0x1F` and `3 sq.ft`: a name between u and j
// that is no unit, but a word for multiplication or for a power of the unit
// behind it. lit is the start of the literal.
func (p *parser) timesOrPower(lit, u, j int, name string) bool {
	figures := strings.TrimRight(p.s[lit:u], " \t")
	next := p.skipBlanks(j)
	power := map[string]string{"sq": "^2", "square": "^2", "cu": "^3", "cubic": "^3"}[strings.ToLower(name)]
	switch {
	case (name == "x" || name == "X") && j < next && next < p.end && (isDigit(p.s[next]) || byteClass[p.s[next]]&nameByte != 0):
		p.syntax(lit, p.operandEnd(next), fmt.Sprintf("%s is no sign of multiplication", quoted(name)), "write "+quoted(figures+" * "+p.s[next:p.operandEnd(next)]))
	case figures == "0" && u == lit+1 && (name[0] == 'x' || name[0] == 'X'):
		value, err := strconv.ParseUint(name[1:], 16, 32)
		if err != nil {
			return false
		}
		p.syntax(lit, j, "numbers are decimal", "write "+quoted(strconv.FormatUint(value, 10)))
	case power != "":
		if next < p.end && p.s[next] == '.' {
			next = p.skipBlanks(next + 1)
		}
		end := next
		for end < p.end && byteClass[p.s[end]]&nameByte != 0 {
			end++
		}
		if !units.IsUnitName(p.s[next:end]) {
			return false
		}
		p.fail(p.span(lit, end), diag.WrongUnitSpelling, fmt.Sprintf("%s is written %s", quoted(p.s[u:end]), quoted(p.s[next:end]+power)),
			"write "+quoted(figures+" "+p.s[next:end]+power))
	default:
		return false
	}
	return true
}

// looksLikeUnit tells whether a name may be a unit with a slip rather than the
// name of a value.
func looksLikeUnit(name string) bool {
	return len(name) > 1 && len(name) <= 10 && !strings.ContainsAny(name, "_'0123456789") && greekByName[name] == 0 && isASCII(name)
}

// noFactor reports the name between i and j that stands behind `/` or `*` in
// a unit and is none.
func (p *parser) noFactor(lit, u, i, j int) {
	if _, slip := units.Misspelled(p.s[i:j]); slip {
		if _, err := units.Parse(p.s[u:j]); err != nil {
			p.unitFault(u, p.s[u:j], err)
			return
		}
	}
	_, size := utf8.DecodeLastRuneInString(p.s[:i])
	open := p.s[i-1] == '('
	sign, e := i-size, p.operandEnd(i)
	if open {
		sign--
	}
	whole := quoted(p.s[lit:e])
	does := "multiply by"
	if p.s[sign] == '/' || strings.HasPrefix(p.s[sign:], "÷") {
		does = "divide by"
	}
	p.fail(p.span(lit, e), diag.WrongUnitSpelling, fmt.Sprintf("%s in %s is no unit", quoted(p.s[i:dottedEnd(p.s, i, p.end)]), whole),
		fmt.Sprintf("to %s the value write %s; only a unit is written tight, as in `48 kN/m`", does,
			quoted(p.s[lit:sign]+" "+p.s[sign:i]+" "+p.s[i:e])))
}

// numberBesideNumber reports figures behind a number without a unit: the
// current token, behind the number between start and end.
func (p *parser) numberBesideNumber(start, end int) {
	first := p.s[start:end]
	if j, whole := figuresEnd(p.s, p.start, p.end); whole && j-p.start == 3 && !strings.ContainsAny(first, ".eE/ ") {
		groups := first
		e := p.start
		for {
			k := p.skipBlanks(e)
			m := digitsEnd(p.s, k, p.end)
			if m-k != 3 {
				break
			}
			groups, e = groups+"_"+p.s[k:m], m
		}
		p.syntax(start, e, "figures are not grouped by blanks", fmt.Sprintf("write %s or %s", quoted(strings.ReplaceAll(groups, "_", "")), quoted(groups)))
		return
	}
	e := figureRunEnd(p.s, p.start, p.end)
	p.syntax(start, e, fmt.Sprintf("the numbers %s and %s stand side by side without an operator", quoted(first), quoted(p.s[p.start:e])),
		"for a product write "+quoted(first+" * "+p.s[p.start:e]))
}

// groupEnd returns the end of digit groups behind the comma at i, or 0: a
// comma and exactly three figures, without blanks.
func groupEnd(s string, i, end int) int {
	found := 0
	for i < end && s[i] == ',' {
		j := i + 1
		for j < end && isDigit(s[j]) {
			j++
		}
		if j-i != 4 {
			break
		}
		i, found = j, j
	}
	return found
}

// grouping reports `1,200`; the comma stands at i.
func (p *parser) grouping(start, i int) {
	e := groupEnd(p.s, i, p.end)
	if k, _ := figuresEnd(p.s, e, p.end); e < p.end && p.s[e] == '.' {
		e = k
	}
	text := p.s[start:e]
	plain, under := strings.ReplaceAll(text, ",", ""), strings.ReplaceAll(text, ",", "_")
	hint := fmt.Sprintf("for one number write %s or %s", quoted(plain), quoted(under))
	if p.depth > 0 {
		hint += ", for several arguments " + quoted(strings.ReplaceAll(text, ",", ", "))
	}
	p.syntax(start, e, fmt.Sprintf("a comma separates arguments and groups no figures: %s", quoted(text)), hint)
}

// pointBehind reports a point at i that no figure follows, or a second one.
func (p *parser) pointBehind(start, i int) {
	text := p.s[start:i]
	e := i + 1
	for e < p.end && (isDigit(p.s[e]) || p.s[e] == '.') {
		e++
	}
	if strings.Contains(text, ".") {
		p.syntax(start, e, fmt.Sprintf("the number %s has more than one point", quoted(p.s[start:e])))
		return
	}
	p.syntax(start, i+1, "no figure stands behind the point", "write "+quoted(text))
}

// feetAndInches reports feet and inch marks; the first mark stands at i.
func (p *parser) feetAndInches(start, i int) {
	if e := i + 4; p.s[i] == '\'' && e <= p.end && digitsEnd(p.s, i+1, p.end) == e && (e == p.end || p.s[e] != '"') {
		text := p.s[start:i] + "_" + p.s[i+1:e]
		p.syntax(start, e, "figures are not grouped by `'`", fmt.Sprintf("write %s or %s", quoted(strings.ReplaceAll(text, "_", "")), quoted(text)))
		return
	}
	m, end := p.inchMark(i)
	foot, inch, what := " ft", " in", "feet and inches"
	if before := strings.TrimRight(p.s[:start], " "); strings.HasSuffix(before, "°") || strings.HasSuffix(before, "deg") {
		foot, inch, what = " arcmin", " arcsec", "minutes and seconds of an angle"
	}
	text := p.s[start:i] + inch
	if m == footMark {
		text = p.s[start:i] + foot
		k := end
		for k < p.end && (p.s[k] == ' ' || p.s[k] == '-') {
			k++
		}
		if k < p.end && isDigit(p.s[k]) {
			e := figureRunEnd(p.s, k, p.end)
			text += " " + p.s[k:e] + inch
			end = e
			if m, behind := p.inchMark(e); m == inchMark {
				end = behind
			}
		}
	}
	p.syntax(start, end, what+" are written as units", "write "+quoted(text))
}

type mark int

const (
	noMark mark = iota
	footMark
	inchMark
)

// inchMark reads a mark of feet or inches at i.
func (p *parser) inchMark(i int) (m mark, end int) {
	r, size := utf8.DecodeRuneInString(p.s[i:p.end])
	switch r {
	case '\'', '′', '’':
		if strings.HasPrefix(p.s[i+size:p.end], p.s[i:i+size]) {
			return inchMark, i + 2*size
		}
		return footMark, i + size
	case '"', '″', '”':
		return inchMark, i + size
	}
	return noMark, i
}

// lengthMark reports a typographic mark of feet or inches behind figures that
// end at i.
func (p *parser) lengthMark(start, i int) bool {
	if m, _ := p.inchMark(i); m != noMark {
		p.feetAndInches(start, i)
		return true
	}
	return false
}

// strange reports a character that starts no token.
func (p *parser) strange(i int) {
	r, size := utf8.DecodeRuneInString(p.s[i:p.end])
	next := byte(0)
	if i+1 < p.end {
		next = p.s[i+1]
	}
	if meant := slip(p.s[i], next); meant == "#" {
		p.syntax(i, i+2, "a line starting with `//` is never printed; behind a statement a note starts with `#`", "write `#`")
		return
	} else if meant != "" {
		p.syntax(i, i+2, fmt.Sprintf("%s is written %s", quoted(p.s[i:i+2]), quoted(meant)), "write "+quoted(meant))
		return
	}
	if e := nameEnd(p.s, i+1, p.end); r == '.' && e > i+1 && i > 0 && p.s[i-1] == ')' {
		p.syntax(i, e, "one of a helper's results is picked from a name, not from the call",
			fmt.Sprintf("give the call a line of its own, as in `jnt = helper(…)`; then `jnt%s` picks one", p.s[i:e]))
		return
	}
	if subscript(r) > 0 {
		e := i
		figures := "_"
		for e < p.end {
			r, size := utf8.DecodeRuneInString(p.s[e:p.end])
			if subscript(r) == 0 {
				break
			}
			figures, e = figures+string(subscript(r)), e+size
		}
		p.syntax(i, e, "a subscript is written behind `_`", "write "+quoted(figures))
		return
	}
	if hint := slipRunes[r]; hint != "" {
		end := i + size
		if next == p.s[i] && (r == '&' || r == '|') || r == ':' && next == '=' {
			end++
		}
		p.syntax(i, end, fmt.Sprintf("%s has no meaning here; %s", quoted(p.s[i:end]), hint))
		return
	}
	id, message := diag.UnsupportedCharacter, ""
	switch {
	case r == utf8.RuneError && size <= 1:
		message = "a byte that is no UTF-8 cannot stand in a statement"
	case unicode.Is(unicode.M, r):
		letter, before := utf8.DecodeLastRuneInString(p.s[:i])
		message = fmt.Sprintf("the combining character U+%04X cannot stand in a statement; %s", r, unmarked(letter, r))
		if unicode.IsLetter(letter) {
			i, size = i-before, before+size
		}
	case unicode.IsControl(r):
		message = fmt.Sprintf("the control character U+%04X cannot stand in a statement", r)
	case unicode.In(r, unicode.Hebrew, unicode.Arabic, unicode.Syriac, unicode.Thaana, unicode.Nko):
		message = fmt.Sprintf("the letter U+%04X is written from right to left and cannot stand in a statement; names are of Latin and Greek letters", r)
	case unicode.Is(unicode.Cf, r) || unicode.Is(unicode.Zl, r) || unicode.Is(unicode.Zp, r):
		message = fmt.Sprintf("the invisible character U+%04X cannot stand in a statement", r)
	case unicode.IsLetter(r):
		message = fmt.Sprintf("the letter %q (U+%04X) cannot stand in a statement; names are of Latin and Greek letters", r, r)
	case r < utf8.RuneSelf:
		id, message = diag.Syntax, fmt.Sprintf("%s has no meaning here", quoted(string(r)))
	default:
		message = fmt.Sprintf("the character %q cannot stand in a statement", r)
	}
	p.fail(p.span(i, i+size), id, message)
}

// subscript returns the plain figure of a subscript one, or 0.
func subscript(r rune) rune {
	if r < '₀' || r > '₉' {
		return 0
	}
	return '0' + r - '₀'
}

// slipRunes say what to write for signs that other notations know.
var slipRunes = map[rune]string{
	'&': "conditions are joined by `and`", '|': "conditions are joined by `or`, a magnitude is `abs(x)`",
	'!': "a condition is turned round by `not`", ':': "a name is defined with `=`",
	';': "arguments are parted by commas, and a statement ends with its line", '{': "values stand in round brackets", '}': "values stand in round brackets",
	'–': "a minus is written `-`", '—': "a minus is written `-`", '‐': "a minus is written `-`",
	'“': "a text stands in straight quotes, as in `\"S355\"`", '”': "a text stands in straight quotes, as in `\"S355\"`", '„': "a text stands in straight quotes, as in `\"S355\"`",
	'’': "a prime is written `'`", '′': "a prime is written `'`", '‘': "a prime is written `'`",
	'½': "write `1/2`", '¼': "write `1/4`", '¾': "write `3/4`",
	'?': "a choice is written `2 if a > b`, its further branches on the lines below",
	'≈': "a comparison is made with `==`, within a relative 1e-9", '∞': "values are finite",
	'%': "a percent sign stands behind a number only", '°': "a degree sign stands behind a number only",
	'_': "a name starts with a letter", '\'': "a text stands in double quotes, as in `\"S355\"`",
	'\\': "a statement goes on in the next line behind an operator, a comma or an open bracket",
}

// markNames are what names spell marks as.
var markNames = map[rune]string{
	'\u0302': "hat", '\u0303': "tilde", '\u0304': "bar", '\u0305': "bar", '\u0307': "dot", '\u0308': "ddot", '\u20D7': "vec",
}

// unmarked tells how to do without a combining mark: by the letter that has it,
// else by a subscript.
func unmarked(letter, mark rune) string {
	if !unicode.IsLetter(letter) {
		return "leave it out"
	}
	if one := norm.NFC.String(string(letter) + string(mark)); utf8.RuneCountInString(one) == 1 {
		return "type " + quoted(one) + " as one character"
	}
	if name := markNames[mark]; name != "" {
		return "write " + quoted(string(letter)+"_"+name)
	}
	return "spell it out"
}
