package syntax

import "fmt"

// reductions are the functions that take rows together, which alone may say
// `over` which.
func reduces(name string) bool {
	switch name {
	case "sum", "max", "min", "mean", "count", "extreme":
		return true
	}
	return false
}

// isFunction tells whether a name is that of a built-in function.
func isFunction(name string) bool {
	switch name {
	case "sqrt", "cbrt", "abs", "round", "floor", "ceil", "exp", "ln", "log10", "sin", "cos", "tan",
		"asin", "acos", "atan", "atan2", "sinh", "cosh", "tanh", "hypot", "interpolate":
		return true
	}
	return reduces(name)
}

// call reads the arguments of a call; the current token is the bracket.
func (p *parser) call(fun *Name) Expr {
	defer func() { p.depth-- }()
	if !p.deeper() {
		return p.bad()
	}
	open := p.start
	p.advance()
	var few [4]Arg
	args := few[:0]
	for p.tok != tClose || len(args) > 0 {
		arg, ok := p.argument(args)
		if !ok {
			return p.bad()
		}
		args = append(args, arg)
		if p.tok != tComma {
			break
		}
		p.advance()
		if p.tok == tClose {
			p.syntax(p.lastFrom, p.last, "an argument is missing behind the comma")
			return p.bad()
		}
	}
	end, ok := p.closing(open)
	if !ok {
		return p.bad()
	}
	if !p.checkOver(fun, args) {
		return p.bad()
	}
	c := p.calls.One(p.size)
	c.At, c.Fun = fun.At, fun
	c.At.End = end + p.off
	if len(args) > 0 {
		c.Args = p.args.Take(len(args), p.size)
		copy(c.Args, args)
	}
	return c
}

// argument reads `x`, `x=…` or `x over rows`.
func (p *parser) argument(before []Arg) (arg Arg, ok bool) {
	if p.tok == tEnd && len(before) > 0 && p.prev == tComma {
		p.syntax(p.lastFrom, p.last, "an argument is missing behind the comma")
		return arg, false
	}
	if p.assignFollows() {
		if p.tok != tName {
			p.syntax(p.start, p.pos, fmt.Sprintf("%s is a word of the notation and cannot be an argument's name", quoted(p.here())))
			return arg, false
		}
		if p.dots {
			p.syntax(p.start, p.pos, "an argument's name has no dots")
			return arg, false
		}
		arg.Name = p.name()
		p.advance()
	} else if n := len(before); n > 0 && before[n-1].Name != nil && p.tok != tClose {
		p.syntax(p.start, p.pos, "an argument by position stands behind one by name", "put the arguments by position first, or name this one too")
		return arg, false
	}
	arg.Value = p.value()
	if p.tok == tOver {
		p.advance()
		if p.tok != tName {
			p.syntax(p.lastFrom, p.last, "behind `over` stands the name of the rows, as in `max(F over bolts)`")
			return arg, false
		}
		arg.Over = p.use()
	}
	return arg, p.tok != tFailed
}

// assignFollows tells whether the current token is a word with a single `=`
// behind it.
func (p *parser) assignFollows() bool {
	if p.tok != tName && p.tok < tIf {
		return false
	}
	i := p.skipBlanks(p.pos)
	return i < p.end && p.s[i] == '=' && (i+1 >= p.end || p.s[i+1] != '=')
}

// checkOver holds `over` to reductions of one argument.
func (p *parser) checkOver(fun *Name, args []Arg) bool {
	for _, a := range args {
		switch {
		case a.Over == nil:
		case !reduces(fun.ID):
			p.fail(a.Over.At, "syntax", fmt.Sprintf("`over` stands only where rows are reduced, by `sum max min mean count extreme`, not in `%s`", fun.Text))
			return false
		case len(args) > 1 || a.Name != nil:
			p.fail(a.Over.At, "syntax", "a reduction `over` rows takes one argument, as in `max(F over bolts)`")
			return false
		}
	}
	return true
}
