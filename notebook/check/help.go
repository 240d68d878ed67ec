package check

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// defineHelper enters a helper block of the calc's own and checks it with the
// types its parameters declare, so that a mistake is reported where it stands.
func (c *checker) defineHelper(tree *syntax.Helper) {
	if tree.Name == nil {
		return
	}
	b := &body{c: c, e: c.top, block: c.block}
	l := b.lower(0)
	if !b.fresh(l, tree.Name, true) {
		return
	}
	h := &helper{tree: tree, file: c.top.helpers, place: c.top.above, line: c.in.Source.LineAt(tree.Name.At.Start)}
	c.checkHelper(h)
	c.top.helpers.add(h)
	c.top.above++
}

// helperFile enters the helpers of a file of the author's own.
func (c *checker) helperFile(f *HelperFile) *helperSet {
	out := newHelperSet()
	out.trees = f.Helpers
	for _, tree := range f.Helpers {
		if tree.Name == nil {
			continue
		}
		h := &helper{tree: tree, file: out, place: len(out.order), line: f.Line}
		if out.named(tree.Name.ID) != nil {
			c.report(diag.Diagnostic{ID: diag.Redefined, Source: tree.Source, Span: tree.Name.At,
				Message: fmt.Sprintf("the helper %s is defined twice in this file", tree.Name.Text)})
			continue
		}
		c.checkHelper(h)
		out.add(h)
	}
	return out
}

// checkHelper checks a helper's body with values of the declared types.
func (c *checker) checkHelper(h *helper) {
	before := len(c.prog.Diagnostics)
	l := &lower{e: &env{c: c, src: h.tree.Source, scope: &Scope{}, names: map[string]*Def{}}}
	hc := &HelperCall{Helper: h.tree, Scope: &Scope{}}
	e := c.helperEnv(h, hc)
	sound := true
	for _, p := range h.tree.Params {
		t, def := l.paramType(h, p)
		if t.Kind == Invalid {
			sound = false
		}
		n := l.node(Node{Op: Load, Type: t, Expr: p.Name, Def: &Def{ID: p.Name.ID}})
		if p.Unit != nil && p.Unit.Column {
			n.Type.Rows = []*Rows{{Name: p.Name.ID, File: h.tree.Source.Name}}
		}
		if def != nil {
			n.exact, n.plain = def.rat(), def.plain
		}
		if e.names[p.Name.ID] != nil {
			l.fail(diag.Redefined, p.Name.At, fmt.Sprintf("the parameter %s stands twice", p.Name.Text))
		}
		l.enterParam(e, hc, p, n)
	}
	c.expanding[h.tree] = true
	b := &body{c: c, e: e}
	sound = b.run(h, hc) && sound
	delete(c.expanding, h.tree)
	h.failed = !sound || diag.HasErrors(c.prog.Diagnostics[before:])
	for _, s := range h.tree.Stmts {
		if _, bad := s.(*syntax.BadStmt); bad {
			h.failed, h.unread = true, true
		}
	}
	h.because = h.line
	for _, p := range b.plans {
		if p.Failed && h.file == c.top.helpers {
			h.because = p.Because
			break
		}
	}
}

// helperEnv is the closed world of a helper's body.
func (c *checker) helperEnv(h *helper, hc *HelperCall) *env {
	return &env{c: c, src: h.tree.Source, scope: hc.Scope, names: map[string]*Def{}, funcs: map[string]*function{}, helpers: h.file, above: h.place, library: h.library}
}

// paramType is the type a parameter asks for, and its lowered default, nil
// where it has none.
func (l *lower) paramType(h *helper, p *syntax.Param) (Type, *Node) {
	var def *Node
	if p.Default != nil {
		inner := &lower{e: l.e.c.helperEnv(h, &HelperCall{Scope: &Scope{}}), declared: true}
		def = inner.value(p.Default)
	}
	if p.Unit == nil {
		if def == nil {
			return Type{Kind: Number}, nil
		}
		t := def.Type
		t.Freq = NoFreq
		return t, def
	}
	t := Type{Kind: Number, Dim: p.Unit.Dim, Freq: declaredFreq(p.Unit)}
	if p.Unit.Point {
		t.Kind = Point
	}
	if def != nil && def.ok() && (!def.zero || t.Kind == Point) && (def.Type.Dim != t.Dim || def.Type.Kind != t.Kind) {
		l.fail(diag.DimensionMismatch, p.Default.Span(), fmt.Sprintf("the default of %s is %s, but %s is declared as %s",
			p.Name.Text, l.e.c.describe(def.Type), p.Name.Text, l.unitWords(p.Unit)))
	}
	if def != nil && def.zero && t.Kind == Number {
		zero := *def // 0 fits any dimension
		zero.Type.Dim = t.Dim
		def = &zero
	}
	return t, def
}

func (l *lower) enterParam(e *env, hc *HelperCall, p *syntax.Param, n *Node) {
	t := n.Type
	if p.Unit == nil || !p.Unit.Column {
		t.Rows = nil
	}
	d := e.define(p.Name, t)
	d.exact, d.plain, d.used = n.rat(), n.plain, true
	d.Unit = argUnit(n)
	if p.Unit != nil && p.Unit.Quantity == "" {
		u := p.Unit.Unit
		d.Unit = &u
	}
	if t.Kind == Text && len(n.Type.Rows) == 0 {
		d.Texts = n.texts()
	}
	hc.Params = append(hc.Params, d)
}

// usage is the call of a helper as its reader would write it, by the name that
// it is reached by: `shop.bracket` for one of a file.
func usage(name string, tree *syntax.Helper) string {
	var b strings.Builder
	b.WriteString(name + "(")
	for i, p := range tree.Params {
		if i > 0 {
			b.WriteString(", ")
		}
		b.WriteString(p.Name.Text)
		if p.Default != nil {
			b.WriteString("=" + syntax.Print(tree.Source, p.Default))
		}
	}
	return b.String() + ")"
}

// helperCall binds the arguments of a call and checks the helper's body with
// them; nil where something failed.
func (l *lower) helperCall(x *syntax.Call, h *helper) *HelperCall {
	c, tree := l.e.c, h.tree
	names := make([]*syntax.Name, len(tree.Params))
	for i, p := range tree.Params {
		names[i] = p.Name
	}
	if h.unread { // its parameters may be others than those that could be read
		for _, a := range x.Args {
			l.value(a.Value)
		}
		l.depend(h.because)
		return nil
	}
	values, ok := l.bind(x, names, func(i int) bool { return tree.Params[i].Default != nil }, usage(x.Fun.Text, tree))
	if h.failed {
		for _, v := range values {
			if v != nil {
				l.value(v)
			}
		}
		l.depend(h.because)
		return nil
	}
	if c.depth >= maxNesting {
		l.fail(diag.BoundExceeded, x.At, fmt.Sprintf("helpers call each other over %d deep, the bound", maxNesting))
		return nil
	}
	if c.expanding[tree] {
		l.fail(diag.UnknownName, x.Fun.At, fmt.Sprintf("%s is not yet defined inside its own definition", tree.Name.Text), "a helper cannot call itself")
		return nil
	}
	hc := &HelperCall{Expr: x, Helper: tree, Library: h.library, Scope: &Scope{}}
	e := c.helperEnv(h, hc)
	for i, p := range tree.Params {
		if n := l.argument(x, h, p, values[i]); n.ok() {
			hc.Args = append(hc.Args, n)
			hc.Given = append(hc.Given, values[i] != nil)
			hc.Columns = append(hc.Columns, p.Unit != nil && p.Unit.Column)
		} else {
			ok = false
		}
	}
	if !ok {
		l.failed = true
		return nil
	}
	if !l.loop(x, hc) {
		return nil
	}
	for i, p := range tree.Params {
		n := *hc.Args[i]
		if hc.Columns[i] {
			n.Type.Rows = columnRows(n.Type.Rows, hc.Loop)
		}
		l.enterParam(e, hc, p, &n)
	}
	return l.expand(x, h, hc, e)
}

func (l *lower) expand(x *syntax.Call, h *helper, hc *HelperCall, e *env) *HelperCall {
	c := l.e.c
	site, in := &x.At, l.e
	if l.site != nil {
		site, in = l.site, l.siteIn
	}
	c.expanding[h.tree] = true
	c.depth++
	defining := c.defining
	b := &body{c: c, e: e, site: site, siteIn: in, inside: "`" + h.tree.Name.Text + "`"}
	sound := b.run(h, hc)
	c.defining = defining
	c.depth--
	delete(c.expanding, h.tree)
	if !sound {
		l.failed = true
		return nil
	}
	l.cost += b.cost + 1
	if l.cost > maxCost {
		l.fail(diag.BoundExceeded, x.At, fmt.Sprintf("the statement comes to over %d calls of helpers, the bound", maxCost))
		return nil
	}
	return hc
}

// run checks a helper's statements and finds its results.
func (b *body) run(h *helper, hc *HelperCall) bool {
	for _, s := range h.tree.Stmts {
		b.statement(s)
	}
	hc.Plans = b.plans
	sound := true
	for _, p := range b.plans {
		sound = sound && !p.Failed
	}
	for _, g := range h.tree.Gives {
		d := b.e.names[g.ID]
		if d == nil {
			l := b.lower(0)
			var known []string
			for _, p := range b.plans {
				if p.Def != nil {
					known = append(known, p.Def.ID)
				}
			}
			hint := "its lines define " + list(known)
			l.fail(diag.UnknownName, g.At, fmt.Sprintf("%s gives %s, which none of its lines defines", h.tree.Name.Text, g.Text), hint)
			sound = false
			continue
		}
		if d.Type.Kind == Bundle {
			l := b.lower(0)
			l.fail(diag.DimensionMismatch, g.At, fmt.Sprintf("%s gives %s, which has several results itself", h.tree.Name.Text, g.Text), "define a value for the one that is meant")
			sound = false
		}
		hc.Results = append(hc.Results, d)
	}
	return sound
}

// argument lowers one argument and holds it to its parameter.
func (l *lower) argument(x *syntax.Call, h *helper, p *syntax.Param, value syntax.Expr) *Node {
	want, def := l.paramType(h, p)
	if value == nil {
		if def == nil {
			return invalid
		}
		return def
	}
	n := l.value(value)
	if !n.ok() {
		return n
	}
	got := n.Type
	if n.zero && want.Kind == Number {
		out := *n
		out.Type.Dim = want.Dim
		return &out
	}
	who := fmt.Sprintf("%s of %s", p.Name.Text, h.tree.Name.Text)
	if got.Kind != want.Kind || got.Dim != want.Dim {
		message := fmt.Sprintf("%s takes %s, but `%s` is %s", who, l.e.c.describe(want), l.print(value), l.e.c.describe(got))
		if want.Kind == Number && got.Kind == Point {
			return l.fail(diag.DimensionMismatch, value.Span(), message, l.asDifference(value))
		}
		return l.fail(diag.DimensionMismatch, value.Span(), message, append(l.wayOut(want, got), "it is called as `"+usage(x.Fun.Text, h.tree)+"`")...)
	}
	if n.bare && takesAngle(p) {
		l.report(diag.Warning, diag.BareAngle, value.Span(), fmt.Sprintf("%s takes an angle, and the bare number %s is read as radians", who, l.print(value)),
			fmt.Sprintf("write `%s deg` for degrees, `%s rad` to say radians", l.print(value), l.print(value)))
	}
	return l.askFreq(value, n, want.Freq, fmt.Sprintf("%s is asked in %s", who, want.Freq.words()))
}

// takesAngle tells whether a parameter is asked as an angle; one in rad says itself how a bare number is read.
func takesAngle(p *syntax.Param) bool {
	if p.Unit == nil {
		return false
	}
	return p.Unit.Quantity == "" && angular(&p.Unit.Unit) || p.Unit.Quantity == "angle"
}

// angular tells that a unit is one of angles, other than rad.
func angular(u *units.Unit) bool {
	if u == nil {
		return false
	}
	switch u.String() {
	case "deg", "mrad", "arcmin", "arcsec", "grad":
		return true
	}
	return false
}

// loop finds the rows that a call runs over, once for each entry: those of
// the plain parameters' arguments, and those of the columns' arguments beside
// the column itself.
func (l *lower) loop(x *syntax.Call, hc *HelperCall) bool {
	columns := map[*Rows]bool{}
	for i, n := range hc.Args {
		if !hc.Columns[i] {
			continue
		}
		switch len(n.Type.Rows) {
		case 0:
			l.fail(diag.RowMismatch, n.Expr.Span(), fmt.Sprintf("%s of %s takes a column, but `%s` is a plain value", hc.paramName(i), hc.Helper.Name.Text, l.print(n.Expr)),
				"a column comes from a schedule: `bolts.x`")
			return false
		case 1:
			columns[n.Type.Rows[0]] = true
		}
	}
	for i, n := range hc.Args {
		rest := n.Type.Rows
		if hc.Columns[i] && len(rest) > 1 {
			own := columnOf(rest, columns)
			if own == nil {
				l.fail(diag.RowMismatch, n.Expr.Span(), fmt.Sprintf("%s of %s takes one column, but `%s` is %s", hc.paramName(i), hc.Helper.Name.Text, l.print(n.Expr), l.e.c.rowWords(n.Type)))
				return false
			}
			rest = remove(rest, own)
		} else if hc.Columns[i] {
			continue
		}
		rows, err := l.e.c.union(hc.Loop, rest)
		if err != nil {
			l.failRows(x.At, err)
			return false
		}
		hc.Loop = rows
	}
	for _, r := range hc.Loop {
		if columns[r] {
			l.fail(diag.RowMismatch, x.At, fmt.Sprintf("%s takes the rows of %s as a column, and cannot run once for each of them too", hc.Helper.Name.Text, l.e.c.rowsName(r)),
				"reduce the other argument, for instance with `max(…)`")
			return false
		}
	}
	return true
}

// paramName is the name of a parameter before it is entered.
func (hc *HelperCall) paramName(i int) string { return hc.Helper.Params[i].Name.Text }

func columnOf(rows []*Rows, columns map[*Rows]bool) *Rows {
	var found *Rows
	for _, r := range rows {
		if columns[r] {
			if found != nil {
				return nil
			}
			found = r
		}
	}
	return found
}

func remove(rows []*Rows, r *Rows) []*Rows {
	var out []*Rows
	for _, o := range rows {
		if o != r {
			out = append(out, o)
		}
	}
	return out
}

// columnRows are the rows a column has inside a helper: what the call does not loop over.
func columnRows(rows, loop []*Rows) []*Rows {
	for _, r := range loop {
		rows = remove(rows, r)
	}
	return rows
}

// callHelper lowers a helper's call inside an expression, where it stands for its one result.
func (l *lower) callHelper(x *syntax.Call, h *helper) *Node {
	hc := l.helperCall(x, h)
	if hc == nil || len(hc.Results) == 0 { // a helper that gives nothing was reported where it stands
		l.failed = true
		return invalid
	}
	if len(hc.Results) != 1 {
		var names []string
		for _, r := range hc.Results {
			names = append(names, r.ID)
		}
		return l.fail(diag.Syntax, x.At, fmt.Sprintf("%s has the results %s, and is no value itself", h.tree.Name.Text, list(names)),
			fmt.Sprintf("give the call a line and a name of its own, `res = %s(…)`, and use `res.%s`", x.Fun.Text, names[0]))
	}
	t := hc.Results[0].Type
	rows, err := l.e.c.union(hc.Loop, t.Rows)
	if err != nil {
		return l.failRows(x.At, err)
	}
	t.Rows, t.Freq = rows, NoFreq
	return l.node(Node{Op: CallHelp, Expr: x, Type: t, Detail: l.detail(Detail{Help: hc})})
}

// bundleCall finds the helper with several results that is a definition's whole right side.
func (b *body) bundleCall(l *lower, s *syntax.Definition) (*syntax.Call, *helper) {
	if len(s.Branches) != 1 || s.Branches[0].Cond != nil || len(s.Where) > 0 {
		return nil, nil
	}
	x, ok := s.Branches[0].Value.(*syntax.Call)
	if !ok || b.e.function(x.Fun.ID) != nil {
		return nil, nil
	}
	var h *helper
	if key, name, dotted := head(x.Fun.ID); dotted {
		if sp := b.c.spaces[key]; sp != nil && !b.e.closed() {
			h = sp.helpers.named(name)
		}
	} else if h = b.e.helper(x.Fun.ID); h == nil {
		if _, builtin := builtins[x.Fun.ID]; builtin {
			return nil, nil
		}
		if tree := b.c.in.Library.helper(x.Fun.ID); tree != nil {
			h = &helper{tree: tree, library: true}
		}
	}
	if h == nil || len(h.tree.Gives) < 2 {
		return nil, nil
	}
	return x, h
}

// bundle defines a name for a helper with several results.
func (b *body) bundle(p *Plan, l *lower, s *syntax.Definition, x *syntax.Call, h *helper, free bool) {
	d := &Def{ID: s.Name.ID, Symbol: s.Name.Text, Line: p.Line, At: s.Name.At, Plan: p, Scope: b.e.scope, Type: Type{Kind: Bundle}}
	p.Def = d
	if s.Unit != nil {
		l.fail(diag.Syntax, s.Unit.At, fmt.Sprintf("%s has several results, which have units of their own", h.tree.Name.Text), "leave the unit off, and declare it where a result is used")
	}
	p.Helper = l.helperCall(x, h)
	p.Uses = l.uses
	b.cost += l.cost
	if p.Helper == nil || l.failed {
		l.failed = true
		b.failed(p, l)
	} else {
		b.bundleResults(l, d, p.Helper)
	}
	if free {
		b.e.names[d.ID] = d
		for _, r := range d.Results {
			b.e.names[r.ID] = r
		}
	}
}

func (b *body) bundleResults(l *lower, d *Def, hc *HelperCall) {
	for _, r := range hc.Results {
		t := r.Type
		rows, err := b.c.union(hc.Loop, t.Rows)
		if err != nil {
			l.failRows(hc.Expr.At, err)
			return
		}
		t.Rows, t.Freq = rows, NoFreq
		d.Results = append(d.Results, &Def{ID: d.ID + "." + r.ID, Symbol: d.Symbol + "." + r.Symbol, Line: d.Line, At: d.At,
			Scope: b.e.scope, Slot: b.e.scope.newSlot(), Type: t, Unit: declaredUnit(r), used: true})
	}
}

// declaredUnit is the unit a helper's own line declares for a result, nil
// where the line names a quantity.
func declaredUnit(r *Def) *units.Unit {
	if r.Plan == nil {
		return r.Unit
	}
	if s, ok := r.Plan.Stmt.(*syntax.Definition); ok && s.Unit != nil && s.Unit.Quantity == "" {
		return r.Unit
	}
	return nil
}
