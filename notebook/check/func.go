package check

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// The bounds on functions and helpers that call each other.
const (
	maxNesting = 100
	maxCost    = 100_000 // calls that one statement may come to
)

// function enters an author's function. Its names are looked up now; its
// dimensions are checked at each use.
func (b *body) function(s *syntax.Definition) {
	p := b.plan(s)
	p.Func = true
	l := b.lower(s.Slots)
	free := b.fresh(l, s.Name, true)
	f := &function{def: s, env: b.e, line: p.Line, uses: map[string]*Function{}, wrong: map[string]*diag.Span{}}
	params := map[string]bool{}
	for _, n := range s.Params {
		if params[n.ID] {
			l.fail(diag.Redefined, n.At, fmt.Sprintf("the parameter %s stands twice", n.Text))
		}
		params[n.ID] = true
	}
	if s.Unit == nil && len(s.Where) > 0 {
		l.whereItems(s)
	}
	for i := range s.Branches {
		for _, x := range []syntax.Expr{s.Branches[i].Value, s.Branches[i].Cond} {
			if x != nil {
				l.functionNames(x, params, s)
			}
		}
	}
	p.Uses = l.uses
	if l.failed {
		f.failed = true
		b.failed(p, l)
	}
	if free {
		b.e.funcs[s.Name.ID] = f
	}
}

// functionNames resolves the names in a function's body that are not its
// parameters: they must stand above it.
func (l *lower) functionNames(x syntax.Expr, params map[string]bool, s *syntax.Definition) {
	syntax.Walk(x, func(e syntax.Expr) bool {
		switch e := e.(type) {
		case *syntax.Name:
			if !params[e.ID] {
				if d := l.resolve(e); d != nil && d.Failed {
					l.depend(d.Because)
				}
			}
		case *syntax.Call:
			if !l.callable(e.Fun.ID) {
				if e.Fun.ID == s.Name.ID {
					l.fail(diag.UnknownName, e.Fun.At, fmt.Sprintf("%s is not yet defined inside its own definition", s.Name.Text), "a function cannot call itself")
				} else {
					l.unknownFunction(&syntax.Call{At: e.At, Fun: e.Fun})
				}
			}
			for _, a := range e.Args {
				l.functionNames(a.Value, params, s)
			}
			return false
		case *syntax.FirstOf:
			l.fail(diag.Syntax, e.At, "`first of` stands only as the right side of a value's definition")
			return false
		}
		return true
	})
}

func (l *lower) callable(id string) bool {
	if key, _, dotted := head(id); dotted {
		s, ok := l.e.c.spaces[key]
		return ok && s.file != nil
	}
	if l.e.function(id) != nil || l.e.helper(id) != nil || l.e.c.in.Library.has(id) {
		return true
	}
	if _, ok := builtins[id]; ok {
		return true
	}
	return l.e.library && l.e.c.in.Library.Natives[id] != nil
}

// bind puts a call's arguments in the order of the parameters; a missing one is nil.
func (l *lower) bind(x *syntax.Call, params []*syntax.Name, optional func(i int) bool, usage string) ([]syntax.Expr, bool) {
	out := make([]syntax.Expr, len(params))
	ok := true
	bad := func(at diag.Span, message string) {
		ok = false
		l.fail(diag.Syntax, at, message, "it is called as `"+usage+"`")
	}
	name := x.Fun.Text
	for i, a := range x.Args {
		at := i
		if a.Over != nil {
			bad(a.Over.At, "`over` stands only inside a reduction")
		}
		if a.Name != nil {
			at = -1
			var ids []string
			for k, p := range params {
				ids = append(ids, p.ID)
				if p.ID == a.Name.ID {
					at = k
				}
			}
			if at < 0 {
				near := ""
				if n := diag.Nearest(a.Name.ID, ids); n != "" {
					near = "; did you mean `" + n + "`?"
				}
				bad(a.Name.At, fmt.Sprintf("%s has no parameter `%s`%s", name, a.Name.Text, near))
				continue
			}
		}
		if at >= len(params) {
			bad(a.Value.Span(), fmt.Sprintf("%s takes %s, but %s given", name, arguments(len(params), len(params)), count(len(x.Args), "is", "are")))
			break
		}
		if out[at] != nil {
			bad(a.Value.Span(), fmt.Sprintf("%s is given twice to %s", params[at].ID, name))
			continue
		}
		out[at] = a.Value
	}
	var missing []string
	for i, p := range params {
		if out[i] == nil && !optional(i) {
			missing = append(missing, p.ID)
		}
	}
	if ok && len(missing) > 0 {
		bad(x.At, fmt.Sprintf("%s lacks %s", name, list(missing)))
	}
	return out, ok
}

// callFunction lowers a call of an author's function: the body is checked
// anew for each combination of the arguments' types.
func (l *lower) callFunction(x *syntax.Call, f *function) *Node {
	s := f.def
	var names []string
	for _, p := range s.Params {
		names = append(names, p.Text)
	}
	usage := fmt.Sprintf("%s(%s)", s.Name.Text, strings.Join(names, ", "))
	values, ok := l.bind(x, s.Params, func(int) bool { return false }, usage)
	args := l.room(len(values))
	for i, v := range values {
		if v != nil {
			args[i] = l.value(v)
			ok = ok && args[i].ok()
		}
	}
	if f.failed {
		return l.depend(f.line)
	}
	if !ok {
		l.failed = true
		return invalid
	}
	inst := l.instance(x, f, args, usage)
	if inst == nil {
		return invalid
	}
	l.cost += inst.cost
	if l.cost > maxCost {
		return l.fail(diag.BoundExceeded, x.At, fmt.Sprintf("the statement comes to over %d calls of functions, the bound", maxCost))
	}
	t := inst.Body.Type
	return l.node(Node{Op: CallFunc, Expr: x, Args: args, Type: t, Detail: l.detail(Detail{Func: inst})})
}

func (l *lower) instance(x *syntax.Call, f *function, args []*Node, usage string) *Function {
	c := l.e.c
	key := signature(args)
	if inst, ok := f.uses[key]; ok {
		return inst
	}
	site, in := &x.At, l.e
	if l.site != nil {
		site, in = l.site, l.siteIn
	}
	if f.wrong[key] == site {
		l.failed = true
		return nil
	}
	if c.depth++; c.depth > maxNesting {
		c.depth--
		l.fail(diag.BoundExceeded, x.At, fmt.Sprintf("functions call each other over %d deep, the bound", maxNesting))
		return nil
	}
	defer func() { c.depth-- }()
	inst := &Function{Def: f.def, Scope: &Scope{Parent: f.env.scope}, Where: f.def.Where, Unit: f.def.Unit}
	e := &env{c: c, src: f.env.src, scope: inst.Scope, names: map[string]*Def{}, parent: f.env, library: f.env.library}
	for i, p := range f.def.Params {
		d := e.define(p, args[i].Type)
		d.exact, d.plain, d.used, d.zero = args[i].rat(), args[i].plain, true, args[i].zero
		d.Texts = args[i].texts()
		d.Unit = argUnit(args[i])
		inst.Params = append(inst.Params, d)
	}
	inner := &lower{e: e, site: site, siteIn: in, inside: "`" + usage + "`", declared: f.def.Unit != nil, uses: make([]*Def, f.def.Slots)}
	inst.Body = inner.choice(f.def, &Def{ID: f.def.Name.ID})
	inst.Uses = inner.uses
	inst.cost = inner.cost + 1
	if inner.failed {
		l.failed = true
		if inner.because != 0 {
			l.because = inner.because
		}
		f.wrong[key] = site
		return nil
	}
	f.uses[key] = inst
	return inst
}

// argUnit is the unit an argument is printed in inside a function or helper: the caller's own.
func argUnit(n *Node) *units.Unit {
	switch n.Op {
	case Load:
		return n.Def.Unit
	case Const:
		if lit, ok := n.Expr.(*syntax.Number); ok {
			u := lit.Pieces[0].Unit
			return &u
		}
	case Neg:
		return argUnit(n.Args[0])
	}
	return nil
}

// signature is a key of the arguments' types, as far as a body may depend on them.
func signature(args []*Node) string {
	var b strings.Builder
	for _, a := range args {
		fmt.Fprintf(&b, "%d %v %d %t %t", a.Type.Kind, a.Type.Dim, a.Type.Freq, a.zero, a.plain)
		for _, r := range a.Type.Rows {
			fmt.Fprintf(&b, " %p", r)
		}
		if r := a.rat(); r != nil {
			b.WriteString(r.RatString())
		}
		if u := argUnit(a); u != nil {
			b.WriteString(u.String())
		}
		if t := a.texts(); t != nil {
			fmt.Fprintf(&b, "%q", t)
		}
		b.WriteByte(';')
	}
	return b.String()
}
