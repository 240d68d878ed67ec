package syntax

import "fmt"

// isCondition tells whether an expression holds or not, rather than having a
// value.
func isCondition(x Expr) bool {
	for {
		switch e := x.(type) {
		case *Paren:
			x = e.X
		case *Compare:
			return true
		case *Binary:
			return e.Op == And || e.Op == Or
		case *Unary:
			return e.Op == Not
		default:
			return false
		}
	}
}

// needValue refuses a condition where a value belongs.
func (p *parser) needValue(x Expr) Expr {
	if !isCondition(x) {
		return x
	}
	at := x.Span()
	p.fail(at, "syntax", fmt.Sprintf("%s is a condition and has no value", quoted(p.src.Slice(at))),
		"a condition stands behind `check`, `if`, `needs` and `with`")
	return x
}

// needCondition refuses a value where a condition belongs.
func (p *parser) needCondition(x Expr) Expr {
	if _, bad := x.(*Bad); bad || isCondition(x) {
		return x
	}
	if p.tok == tAssign {
		p.syntax(p.start, p.pos, "a condition compares with `==`", "write `==`")
		return x
	}
	at := x.Span()
	p.fail(at, "syntax", fmt.Sprintf("%s is a value, not a condition", quoted(p.src.Slice(at))),
		"compare it with another value by `<`, `<=`, `>`, `>=`, `==` or `!=`")
	return x
}
