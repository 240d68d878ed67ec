package check

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// builtin is the rule of one built-in function: how many arguments it takes
// (most < 0 for any number) and what its dimensions are.
type builtin struct {
	least, most int
	usage       string
	rule        rule
}

type rule int

const (
	sameDim  rule = iota // all arguments of one dimension, which is the result's
	number               // plain numbers or angles to a plain number
	angled               // as number, and a bare literal is warned of
	rooted               // the dimension to the power 1/2 or 1/3
	stepped              // x and an optional step of x's dimension
	reducing             // reduces rows
	minmax               // reduces the rows of one argument, else entry by entry
	ratio                // two of one dimension to a plain number: atan2
	interpol
)

var builtins = map[string]builtin{
	"sqrt": {1, 1, "sqrt(x)", rooted}, "cbrt": {1, 1, "cbrt(x)", rooted},
	"abs": {1, 1, "abs(x)", sameDim}, "hypot": {2, 3, "hypot(x, y)", sameDim},
	"min": {1, -1, "min(x, y, …)", minmax}, "max": {1, -1, "max(x, y, …)", minmax},
	"extreme": {1, 1, "extreme(x)", reducing}, "sum": {1, 1, "sum(x)", reducing},
	"mean": {1, 1, "mean(x)", reducing}, "count": {1, 1, "count(x)", reducing},
	"round": {1, 2, "round(x, step)", stepped}, "floor": {1, 2, "floor(x, step)", stepped}, "ceil": {1, 2, "ceil(x, step)", stepped},
	"exp": {1, 1, "exp(x)", number}, "ln": {1, 1, "ln(x)", number}, "log10": {1, 1, "log10(x)", number},
	"sin": {1, 1, "sin(x)", angled}, "cos": {1, 1, "cos(x)", angled}, "tan": {1, 1, "tan(x)", angled},
	"asin": {1, 1, "asin(x)", number}, "acos": {1, 1, "acos(x)", number}, "atan": {1, 1, "atan(x)", number},
	"sinh": {1, 1, "sinh(x)", number}, "cosh": {1, 1, "cosh(x)", number}, "tanh": {1, 1, "tanh(x)", number},
	"atan2":       {2, 2, "atan2(y, x)", ratio},
	"interpolate": {3, 3, "interpolate(table.x, table.y, x)", interpol},
}

// Builtins lists the names of the built-in functions, as NOTATION gives them.
func Builtins() []string {
	return strings.Fields("sqrt cbrt abs min max extreme sum mean count round floor ceil exp ln log10 sin cos tan asin acos atan atan2 sinh cosh tanh hypot interpolate")
}

// call lowers a call: of an author's function, of a helper, of a built-in function.
func (l *lower) call(x *syntax.Call) *Node {
	id := x.Fun.ID
	if space, name, dotted := head(id); dotted {
		return l.callDotted(x, space, name)
	}
	if f := l.e.function(id); f != nil {
		return l.callFunction(x, f)
	}
	if h := l.e.helper(id); h != nil {
		return l.callHelper(x, h)
	}
	if b, ok := builtins[id]; ok {
		return l.callBuiltin(x, b)
	}
	if l.e.library {
		if n, ok := l.e.c.in.Library.Natives[id]; ok {
			return l.callNative(x, n)
		}
	}
	if h := l.e.c.in.Library.helper(id); h != nil {
		return l.callHelper(x, &helper{tree: h, library: true})
	}
	return l.unknownFunction(x)
}

func (l *lower) unknownFunction(x *syntax.Call) *Node {
	for _, a := range x.Args {
		l.expr(a.Value)
	}
	id := x.Fun.ID
	if f := l.e.c.top.funcs[id]; f != nil && l.site == nil && l.e.closed() {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("%s is a function of the calc (line %d), and a helper calls built-in functions and other helpers only", x.Fun.Text, f.line),
			"make it a helper above this one")
	}
	if line, ok := l.e.c.laterFunction(id); ok && l.site == nil {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("%s is not yet defined: its definition stands at line %d", x.Fun.Text, line),
			"a function is defined above its first use, and cannot call itself")
	}
	if line := l.e.laterHelper(id); line > 0 && l.site == nil {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("%s is not yet defined: its definition stands at line %d", x.Fun.Text, line),
			"a helper is defined above its first use, and cannot call itself")
	}
	if d := l.e.lookup(id); d != nil {
		if d.Failed && d.Plan == nil { // its line could not be read, and may be meant for a function
			return l.depend(d.Because)
		}
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("%s is a value (line %d), no function", x.Fun.Text, d.Line),
			fmt.Sprintf("for a product write `%s*%s`", x.Fun.Text, l.e.src.Slice(diag.Span{Start: x.Fun.At.End, End: x.At.End})))
	}
	if own, ok := otherNames[id]; ok {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("there is no function `%s`", x.Fun.Text), own)
	}
	known := append(Builtins(), l.e.functionNames()...)
	hint := "`gusset notation expressions` lists the functions, `gusset helpers` the helpers"
	if near := diag.Nearest(id, known); near != "" {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("there is no function or helper `%s`", x.Fun.Text), "did you mean `"+near+"`?", hint)
	}
	return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("there is no function or helper `%s`", x.Fun.Text), hint)
}

// otherNames say what the functions of other notations are here.
var otherNames = map[string]string{
	"log": "`ln` is the natural logarithm, `log10` the decimal one", "lg": "did you mean `log10`?",
	"arcsin": "did you mean `asin`?", "arccos": "did you mean `acos`?", "arctan": "did you mean `atan`?", "tg": "did you mean `tan`?",
	"average": "did you mean `mean`?", "avg": "did you mean `mean`?", "ceiling": "did you mean `ceil`?", "int": "did you mean `floor`?", "trunc": "did you mean `floor`?",
	"pow": "a power is written `x^y`",
}

// callDotted lowers a call of a helper of the author's own file: `shop.bracket(…)`.
func (l *lower) callDotted(x *syntax.Call, key, name string) *Node {
	s, ok := l.e.c.spaces[key]
	if ok && s.file != nil && l.e.closed() {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("a helper does not reach the calc's helper file `%s`", key),
			"it calls the library that ships, and the helpers above it")
	}
	if ok && s.from != nil {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("`%s` is a carried file, and functions and helpers are not carried", key),
			"helpers that several calcs share stand in a file that `helpers` names")
	}
	if !ok || s.file == nil {
		var keys []string
		for _, f := range l.e.c.in.Helpers {
			keys = append(keys, f.Key)
		}
		hint := "name the file in the front matter: `helpers: {" + key + ": " + key + ".md}`"
		if near := diag.Nearest(key, keys); near != "" {
			hint = "did you mean `" + near + "`?"
		}
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("there is no helper file `%s`", key), hint)
	}
	if s.file.Failed {
		return l.depend(s.line)
	}
	var names []string
	if h := s.helpers.named(name); h != nil {
		return l.callHelper(x, h)
	}
	if !l.e.c.looks.May(len(s.helpers.order)) {
		return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("%s has no helper `%s`", s.file.Path, name))
	}
	for _, h := range s.helpers.order {
		names = append(names, key+"."+h.tree.Name.ID)
	}
	hint := "it has " + list(names)
	if len(names) == 0 {
		hint = "the file defines no helper"
	}
	return l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("%s has no helper `%s`", s.file.Path, name), hint)
}

func (l *lower) callBuiltin(x *syntax.Call, b builtin) *Node {
	name := x.Fun.ID
	over := false
	for _, a := range x.Args {
		if a.Name != nil {
			return l.fail(diag.Syntax, a.Name.At, fmt.Sprintf("%s takes its arguments by position", name), "write `"+b.usage+"`")
		}
		over = over || a.Over != nil
	}
	if n := len(x.Args); n < b.least || b.most >= 0 && n > b.most {
		return l.fail(diag.Syntax, x.At, fmt.Sprintf("%s takes %s, but %s given", name, arguments(b.least, b.most), count(n, "is", "are")), "write `"+b.usage+"`")
	}
	reduces := b.rule == reducing || b.rule == minmax && len(x.Args) == 1
	if over && !reduces {
		return l.fail(diag.Syntax, x.At, "`over` stands only inside a reduction of one value, such as `max(F over bolts)`")
	}
	args := l.room(len(x.Args))
	bad := false
	for i, a := range x.Args {
		args[i] = l.value(a.Value)
		bad = bad || !args[i].ok()
	}
	if bad {
		return invalid
	}
	if reduces {
		return l.reduce(x, args[0])
	}
	n := l.node(Node{Op: Builtin, Expr: x, Args: args, plain: true, Detail: l.detail(Detail{Fn: name})})
	n.Type = Type{Kind: Number}
	for i, a := range args {
		n.plain = n.plain && a.plain
		rows, err := l.e.c.union(n.Type.Rows, a.Type.Rows)
		if err != nil {
			return l.failRows(x.Args[i].Value.Span(), err)
		}
		n.Type.Rows = rows
	}
	if b.rule == interpol {
		return l.interpolate(x, args)
	}
	if !l.builtinDims(x, n, b) {
		return invalid
	}
	return n
}

// builtinDims checks the dimensions of a built-in function's arguments and
// sets its result's.
func (l *lower) builtinDims(x *syntax.Call, n *Node, b builtin) bool {
	for i, a := range n.Args {
		if a.Type.Kind == Text || a.Type.Kind == Point && b.rule != minmax {
			l.fail(diag.DimensionMismatch, x.Args[i].Value.Span(), fmt.Sprintf("%s takes numbers, but `%s` is %s", n.Fn, l.print(x.Args[i].Value), l.e.c.describe(a.Type)))
			return false
		}
	}
	first := n.Args[0].Type
	switch b.rule {
	case number, angled:
		if !first.Dim.IsNumber() {
			l.fail(diag.DimensionMismatch, x.Args[0].Value.Span(), fmt.Sprintf("%s takes a plain number or an angle, but `%s` is %s", n.Fn, l.print(x.Args[0].Value), l.e.c.describe(first)),
				"divide it by a value of its own dimension first")
			return false
		}
		if lit := x.Args[0].Value; b.rule == angled && n.Args[0].bare && !n.Args[0].zero {
			l.report(diag.Warning, diag.BareAngle, lit.Span(), fmt.Sprintf("the bare number %s is read as radians", l.print(lit)),
				fmt.Sprintf("write `%s(%s deg)` for degrees, `%s(%s rad)` to say radians", n.Fn, l.print(lit), n.Fn, l.print(lit)))
		}
	case rooted:
		den := int64(2)
		if n.Fn == "cbrt" {
			den = 3
		}
		dim, err := first.Dim.Pow(1, den)
		if err != nil {
			l.fail(diag.BoundExceeded, x.At, err.Error())
			return false
		}
		n.Type.Dim = dim
	case stepped:
		if len(n.Args) == 1 && !first.Dim.IsNumber() && !n.Args[0].zero {
			l.fail(diag.DimensionMismatch, x.Args[0].Value.Span(), fmt.Sprintf("%s of %s needs a step with a unit", n.Fn, l.e.c.describe(first)),
				fmt.Sprintf("write `%s, 1 %s`", l.print(x.Args[0].Value), l.e.c.in.Printing.UnitFor(first.Dim, false)))
			return false
		}
		return l.oneDimension(x, n, b)
	default:
		return l.oneDimension(x, n, b)
	}
	return true
}

// oneDimension holds all arguments to one dimension; a literal 0 fits any.
func (l *lower) oneDimension(x *syntax.Call, n *Node, b builtin) bool {
	lead := -1
	for i, a := range n.Args {
		if a.zero {
			continue
		}
		if lead < 0 {
			lead = i
			n.Type.Dim, n.Type.Kind = a.Type.Dim, a.Type.Kind
			if b.rule == minmax || n.Fn == "abs" { // they pick one of their arguments
				n.Type.Freq = a.Type.Freq
			}
			continue
		}
		first := n.Args[lead].Type
		if a.Type.Dim != first.Dim || (a.Type.Kind == Point) != (first.Kind == Point) {
			l.mismatch(x.Args[i].Value.Span(), fmt.Sprintf("%s takes values of one dimension: `%s` is %s, but `%s` is %s", n.Fn,
				l.print(x.Args[lead].Value), l.e.c.describe(first), l.print(x.Args[i].Value), l.e.c.describe(a.Type)), first, a.Type)
			return false
		}
		if b.rule == minmax && !l.askFreq(x.Args[i].Value, a, first.Freq, fmt.Sprintf("`%s` is in %s", l.print(x.Args[lead].Value), first.Freq.words())).ok() {
			return false
		}
		if a.Type.Freq == NoFreq {
			n.Type.Freq = NoFreq
		}
	}
	for i, a := range n.Args {
		if a.zero && l.noZero(n.Type, x.Args[i].Value) {
			return false
		}
	}
	if b.rule == ratio {
		n.Type.Dim = units.Dimension{}
	}
	return true
}

// callNative lowers a library helper's call of a function in Go.
func (l *lower) callNative(x *syntax.Call, f *Native) *Node {
	n := l.node(Node{Op: CallGo, Expr: x, Type: Type{Kind: Number, Dim: f.Result}, Detail: l.detail(Detail{Native: f})})
	if len(x.Args) != len(f.Params) {
		return l.fail(diag.Syntax, x.At, fmt.Sprintf("%s takes %s", f.Name, arguments(len(f.Params), len(f.Params))))
	}
	for i, a := range x.Args {
		arg := l.value(a.Value)
		if !arg.ok() {
			return invalid
		}
		p := f.Params[i]
		if arg.Type.Dim != p.Dim && !arg.zero {
			return l.fail(diag.DimensionMismatch, a.Value.Span(), fmt.Sprintf("%s takes %s here, but `%s` is %s", f.Name, p.Dim.Article(), l.print(a.Value), l.e.c.describe(arg.Type)))
		}
		if !p.Column {
			rows, err := l.e.c.union(n.Type.Rows, arg.Type.Rows)
			if err != nil {
				return l.failRows(x.At, err)
			}
			n.Type.Rows = rows
		}
		n.Args = append(n.Args, arg)
	}
	return n
}

func arguments(least, most int) string {
	switch {
	case most < 0:
		return fmt.Sprintf("at least %s", count(least, "argument", "arguments"))
	case least == most:
		return count(least, "argument", "arguments")
	}
	return fmt.Sprintf("%d or %d arguments", least, most)
}

func count(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %s", n, many)
}
