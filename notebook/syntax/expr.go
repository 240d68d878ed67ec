package syntax

import (
	"fmt"

	"gusset/notebook/diag"
)

// The levels of binding, from the loosest to the tightest. Unary minus stands
// between products and powers; `at` binds tighter than all of these.
const (
	levelOr = 1 + iota
	levelAnd
	levelNot
	levelCompare
	levelSum
	levelProduct
	levelMinus
	levelPower
)

// levels and operators are by token; 0 is no binary operator.
var levels = [tGives + 1]uint8{
	tOr: levelOr, tAnd: levelAnd,
	tLt: levelCompare, tLe: levelCompare, tGt: levelCompare, tGe: levelCompare, tEq: levelCompare, tNe: levelCompare,
	tPlus: levelSum, tMinus: levelSum, tTimes: levelProduct, tSlash: levelProduct,
	tPower: levelPower, tSuper: levelPower,
}

var operators = [tGives + 1]Op{
	tOr: Or, tAnd: And, tLt: Lt, tLe: Le, tGt: Gt, tGe: Ge, tEq: Eq, tNe: Ne,
	tPlus: Add, tMinus: Sub, tTimes: Mul, tSlash: Div, tPower: Pow, tSuper: Pow,
}

// value reads an expression that has to be a value.
func (p *parser) value() Expr { return p.needValue(p.expression(levelOr)) }

// condition reads an expression that has to be a condition.
func (p *parser) condition() Expr { return p.needCondition(p.expression(levelOr)) }

// expression reads operands joined by operators that bind at least as tightly
// as level.
func (p *parser) expression(level uint8) Expr {
	x := p.prefix(level)
	for {
		l := levels[p.tok]
		if l < level || l == 0 {
			return x
		}
		if l != levelCompare && !p.oneMore() {
			return x
		}
		switch l {
		case levelCompare:
			x = p.comparison(x)
		case levelPower:
			x = p.power(x)
		default:
			op, at := operators[p.tok], p.span(p.start, p.pos)
			p.advance()
			y := p.expression(l + 1)
			if l <= levelAnd {
				x, y = p.needCondition(x), p.needCondition(y)
			} else {
				x, y = p.needValue(x), p.needValue(y)
			}
			x = p.binary(op, at, x, y)
		}
	}
}

func (p *parser) binary(op Op, at diag.Span, x, y Expr) Expr {
	b := p.binaries.One(p.size)
	*b = Binary{At: x.Span().To(y.Span()), Op: op, OpAt: at, X: x, Y: y}
	return b
}

// deeper counts a level of nesting; it is false over the bound. Each call has
// its p.depth-- behind it.
func (p *parser) deeper() bool {
	p.depth++
	if p.depth <= maxDepth {
		return true
	}
	p.fail(p.span(p.start, p.pos), diag.BoundExceeded,
		fmt.Sprintf("brackets, calls, signs and powers nest more than %d deep", maxDepth), "define parts of it on lines of their own")
	return false
}

// oneMore counts an operator or a comma; it is false over the bound.
func (p *parser) oneMore() bool {
	p.ops++
	if p.ops <= maxOperators {
		return true
	}
	p.fail(p.span(p.start, p.pos), diag.BoundExceeded,
		fmt.Sprintf("one statement has more operators and commas than the bound of %d", maxOperators), "define parts of it on lines of their own")
	return false
}

// prefix reads an operand with the signs and words before it.
func (p *parser) prefix(level uint8) Expr {
	switch p.tok {
	case tMinus, tPlus, tNot:
	default:
		return p.operand()
	}
	defer func() { p.depth-- }()
	if !p.deeper() {
		return p.bad()
	}
	tok, start, end := p.tok, p.start, p.pos
	if tok == tNot && level > levelNot {
		p.syntax(start, end, "`not` wants brackets behind an operator")
		return p.bad()
	}
	p.advance()
	switch tok {
	case tNot:
		x := p.needCondition(p.expression(levelNot))
		return p.unary(Not, start, x)
	case tPlus:
		return p.needValue(p.expression(levelMinus))
	}
	touches := p.start == end
	x := p.needValue(p.expression(levelMinus))
	if n, ok := x.(*Number); ok && touches && !n.Neg && len(n.Pieces) == 1 && n.Pieces[0].HasUnit && n.Pieces[0].Unit.IsPoint() {
		n.Neg, n.At.Start = true, start+p.off
		return n
	}
	return p.unary(Neg, start, x)
}

func (p *parser) unary(op Op, start int, x Expr) Expr {
	u := p.unaries.One(p.size)
	*u = Unary{At: diag.Span{Start: start + p.off, End: x.Span().End}, Op: op, X: x}
	return u
}

// power reads the exponent behind a base.
func (p *parser) power(x Expr) Expr {
	at := p.span(p.start, p.pos)
	var y Expr
	if p.tok == tSuper {
		y = p.superscript()
		if p.tok == tPower || p.tok == tSuper {
			p.syntax(p.start, p.pos, "a power of a power wants brackets, as in `(x^2)^3`")
		}
	} else {
		defer func() { p.depth-- }()
		if !p.deeper() {
			return x
		}
		p.advance()
		y = p.expression(levelPower)
	}
	return p.binary(Pow, at, p.needValue(x), p.needValue(y))
}

// superscript reads a run of superscript figures as an exponent.
func (p *parser) superscript() Expr {
	text, start, end := p.here(), p.start, p.pos
	plain := make([]byte, 0, 4)
	for _, r := range text {
		plain = append(plain, superFigure(r))
	}
	minus := plain[0] == '-'
	figures := string(plain)
	if minus {
		figures = figures[1:]
	}
	for i := range len(figures) {
		if figures[i] == '-' {
			figures = ""
			break
		}
	}
	if figures == "" {
		p.syntax(start, end, fmt.Sprintf("the superscript %s is no number", quoted(text)))
		return p.bad()
	}
	p.advance()
	from := start
	if minus {
		from += len("⁻")
	}
	n := p.numbers.One(p.size)
	n.At, n.Pieces = p.span(from, end), p.pieces.Take(1, p.size)
	n.Pieces[0] = Piece{Figures: figures, At: n.At}
	if minus {
		return p.unary(Neg, start, n)
	}
	return n
}

// comparison reads a chain of comparisons behind its first operand.
func (p *parser) comparison(x Expr) Expr {
	c := &Compare{Operands: []Expr{p.needValue(x)}}
	first := operators[p.tok]
	for levels[p.tok] == levelCompare {
		if op := operators[p.tok]; len(c.Ops) > 0 && (direction(op) != direction(first) || op == Ne) {
			p.syntax(p.start, p.pos, fmt.Sprintf("the signs of a chain of comparisons point one way; `%s` does not go with `%s`", op, first),
				"join two comparisons by `and`, in a check write two checks")
			return x
		}
		c.Ops = append(c.Ops, operators[p.tok])
		c.OpsAt = append(c.OpsAt, p.span(p.start, p.pos))
		if !p.oneMore() {
			return x
		}
		p.advance()
		c.Operands = append(c.Operands, p.needValue(p.expression(levelSum)))
	}
	if p.tok == tFailed {
		return p.bad()
	}
	c.At = c.Operands[0].Span().To(c.Operands[len(c.Operands)-1].Span())
	return c
}

func direction(op Op) int {
	switch op {
	case Lt, Le:
		return -1
	case Gt, Ge:
		return 1
	}
	return 0
}

// operand reads what operators join: a number, a name, a text, a call or a
// bracket, with `at` behind it.
func (p *parser) operand() Expr {
	x := p.primary()
	for p.tok == tAt && p.oneMore() {
		at := p.span(p.start, p.pos)
		p.advance()
		y := p.primary()
		x = &AtMark{At: x.Span().To(y.Span()), OpAt: at, X: p.needValue(x), Y: p.needValue(y)}
	}
	return x
}

func (p *parser) primary() Expr {
	switch p.tok {
	case tName:
		if p.nextIsOpen() {
			return p.call(p.use())
		}
		n := p.use()
		return n
	case tNumber:
		return p.number()
	case tText:
		t := &Text{At: p.span(p.start, p.pos), Value: p.s[p.start+1 : p.pos-1]}
		p.advance()
		return t
	case tOpen:
		return p.paren()
	case tRoot:
		return p.root()
	}
	p.noValue()
	return p.bad()
}

// use reads a name that stands for a value.
func (p *parser) use() *Name {
	n := p.name()
	n.Slot = p.slots
	p.slots++
	return n
}

// name reads the name that is the current token.
func (p *parser) name() *Name {
	n := p.names.One(p.size)
	text := p.here()
	*n = Name{At: p.span(p.start, p.pos), ID: Canonical(text), Text: text, Slot: -1}
	p.advance()
	return n
}

// nextIsOpen tells whether a bracket follows the current token.
func (p *parser) nextIsOpen() bool {
	i := p.pos
	if i < p.end && p.s[i] != ' ' {
		return p.s[i] == '('
	}
	i = p.skipBlanks(i)
	return i < p.end && p.s[i] == '('
}

func (p *parser) paren() Expr {
	defer func() { p.depth-- }()
	if !p.deeper() {
		return p.bad()
	}
	start := p.start
	p.advance()
	x := p.expression(levelOr)
	end, ok := p.closing(start)
	if !ok {
		return p.bad()
	}
	b := p.parens.One(p.size)
	*b = Paren{At: p.span(start, end), X: x}
	return b
}

// closing reads the bracket that closes the one at open; it returns its end.
func (p *parser) closing(open int) (int, bool) {
	if p.tok == tClose {
		end := p.pos
		p.advance()
		return end, true
	}
	if p.tok == tEnd {
		p.syntax(open, open+1, "the bracket `(` is not closed")
	} else {
		p.leftover()
	}
	return 0, false
}

// root reads `√x`, which stands for sqrt(x).
func (p *parser) root() Expr {
	defer func() { p.depth-- }()
	if !p.deeper() {
		return p.bad()
	}
	start, sign := p.start, p.pos
	fun := p.names.One(p.size)
	*fun = Name{At: p.span(start, sign), ID: "sqrt", Text: "sqrt", Slot: p.slots}
	p.slots++
	p.advance()
	from := p.start
	x := p.needValue(p.primary())
	end := x.Span().End - p.off
	if p.tok == tPower || p.tok == tSuper {
		e := p.pos
		if p.tok == tPower {
			e = p.operandEnd(p.skipBlanks(p.pos))
		}
		under, power := p.s[from:end], p.s[p.start:e]
		p.syntax(start, e, "the root of a power wants brackets",
			fmt.Sprintf("write %s or %s", quoted("√("+under+power+")"), quoted("(√"+under+")"+power)))
		return p.bad()
	}
	if b, ok := x.(*Paren); ok {
		x = b.X // the brackets are those of the call
	}
	c := p.calls.One(p.size)
	c.At, c.Fun, c.Args = p.span(start, end), fun, p.args.Take(1, p.size)
	c.Args[0].Value = x
	return c
}
