package check

import (
	"fmt"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// body is a run of statements in one environment: the calc's own blocks, or a
// helper's lines for one call.
type body struct {
	c      *checker
	e      *env
	block  int
	plans  []*Plan
	site   *diag.Span // of the call, inside a helper
	siteIn *env
	inside string
	cost   int
}

func (b *body) lower(slots int) *lower {
	s := &b.c.slabs
	l := s.lowers.One(chunk)
	l.e, l.uses, l.site, l.siteIn, l.inside = b.e, s.uses.Take(slots, 2*chunk), b.site, b.siteIn, b.inside
	return l
}

func (b *body) plan(s syntax.Stmt) *Plan {
	p := b.c.slabs.plans.One(chunk)
	p.Stmt, p.Line, p.Block = s, b.e.src.LineAt(s.Span().Start), b.block
	b.plans = append(b.plans, p)
	return p
}

func (b *body) statement(s syntax.Stmt) {
	switch s := s.(type) {
	case *syntax.Definition:
		b.definition(s)
	case *syntax.Check:
		b.check(s)
	case *syntax.Needs:
		b.needs(s)
	case *syntax.BadStmt:
		p := b.plan(s)
		p.Failed, p.Because = true, p.Line
		if s.Name != nil && b.e.lookup(s.Name.ID) == nil {
			d := b.e.define(s.Name, Type{})
			d.Failed, d.Because = true, p.Line
			p.Def = d
		}
	case *syntax.NoteLine, *syntax.Gap:
		b.plan(s)
	}
}

// fresh reports a name that stands for something already.
func (b *body) fresh(l *lower, n *syntax.Name, function bool) bool {
	what, line := "", 0
	if b.e == b.c.top {
		what, line = b.c.occupied(n.ID)
	} else if d := b.e.names[n.ID]; d != nil {
		what, line = "a value", d.Line
	} else if b.c.consts[n.ID] != nil {
		what = "a constant"
	} else if f := b.e.funcs[n.ID]; f != nil {
		what, line = "a function", f.line
	}
	if _, builtin := builtins[n.ID]; function && builtin {
		l.fail(diag.Redefined, n.At, fmt.Sprintf("%s is a built-in function, which cannot be redefined", n.Text), "give the function another name")
		return false
	}
	if what == "" {
		return true
	}
	where := fmt.Sprintf(", at line %d", line)
	if line == 0 {
		where = ""
	}
	l.fail(diag.Redefined, n.At, fmt.Sprintf("%s is already defined as %s%s", n.Text, what, where), "a name is defined once; give the new value a name of its own, such as `"+n.Text+"_2`")
	return false
}

func (b *body) definition(s *syntax.Definition) {
	if s.Func {
		b.function(s)
		return
	}
	p := b.plan(s)
	l := b.lower(s.Slots)
	l.declared = s.Unit != nil
	free := b.fresh(l, s.Name, false)
	b.c.defining = s.Name.ID
	if call, h := b.bundleCall(l, s); h != nil {
		b.bundle(p, l, s, call, h, free)
		b.c.defining = ""
		return
	}
	d := b.c.slabs.defs.One(chunk)
	d.ID, d.Symbol, d.Line, d.At, d.Plan, d.Scope = s.Name.ID, s.Name.Text, p.Line, s.Name.At, p, b.e.scope
	p.Def = d
	p.Choice = l.choice(s, d)
	b.c.defining = ""
	d.Type = p.Choice.Type
	d.Slot = b.e.scope.newSlot()
	p.Uses = l.uses
	b.cost += l.cost
	if l.failed {
		b.failed(p, l)
	} else {
		b.printed(p, s)
	}
	if free {
		b.e.names[d.ID] = d
	}
}

// failed marks a statement that cannot be computed, and the value it defines.
func (b *body) failed(p *Plan, l *lower) {
	p.Failed, p.Because = true, l.because
	if p.Because == 0 {
		p.Because = p.Line
	}
	if p.Def != nil {
		p.Def.Failed, p.Def.Because = true, p.Because
	}
}

// printed says how the value of a sound definition is printed: what is given
// keeps the author's own figures and unit.
func (b *body) printed(p *Plan, s *syntax.Definition) {
	d := p.Def
	if s.Unit != nil && s.Unit.Quantity == "" {
		d.Unit = &s.Unit.Unit
	}
	if len(s.Branches) != 1 || s.Branches[0].Cond != nil || len(s.Where) > 0 || p.Choice.FirstOf != nil {
		return
	}
	n := p.Choice.Branches[0].Value
	d.exact, d.plain = n.rat(), n.plain
	value := s.Branches[0].Value
	switch v := value.(type) {
	case *syntax.Text:
		p.IsGiven = true
		d.Texts = []string{v.Value}
		return
	case *syntax.AtMark:
		d.Texts = n.texts()
	case *syntax.Name:
		d.Texts, d.Picked = n.texts(), picked(n)
		p.Carried = n.Op == Load && n.Def.Carry != nil
		if n.Op == Load && d.Unit == nil && n.Def.Unit != nil {
			d.Unit = n.Def.Unit
		}
		return
	case *syntax.Unary:
		value = v.X
	}
	lit, ok := value.(*syntax.Number)
	if !ok {
		return
	}
	p.IsGiven = true
	u := &lit.Pieces[0].Unit
	if d.Unit == nil {
		d.Unit = u
	}
	if d.Unit.Equal(*u) {
		d.Literal = lit
	}
}

func picked(n *Node) *Rows {
	if n.Op == Load {
		return n.Def.Picked
	}
	return nil
}

// choice lowers the right side of a definition: its branches, of one
// dimension, held to the declared unit.
func (l *lower) choice(s *syntax.Definition, d *Def) Choice {
	var ch Choice
	if !l.whereItems(s) {
		return ch
	}
	if f, ok := s.Branches[0].Value.(*syntax.FirstOf); ok && len(s.Branches) == 1 {
		return l.firstOf(f, s, d)
	}
	ch.Branches = l.e.c.slabs.branches.Take(len(s.Branches), chunk)[:0]
	lead := -1 // the branch that sets the dimension: the first that is no literal 0
	for i := range s.Branches {
		br := &s.Branches[i]
		var out Branch
		out.Value = l.value(br.Value)
		if br.Cond != nil {
			out.Cond = l.condition(br.Cond)
		}
		if !out.Value.ok() || out.Cond != nil && !out.Cond.ok() {
			continue
		}
		out.Value = l.declare(s, br.Value, out.Value)
		if !out.Value.ok() {
			continue
		}
		if !out.Value.zero && lead >= 0 && !l.sameBranch(s, br, ch.Branches[lead].Value, out.Value) {
			continue
		}
		ch.Branches = append(ch.Branches, out)
		if lead < 0 && !out.Value.zero {
			lead = len(ch.Branches) - 1
		}
		l.choiceRows(&ch, br, out)
	}
	if l.failed {
		return Choice{}
	}
	t := ch.Branches[max(lead, 0)].Value.Type
	for i := range ch.Branches {
		if n := ch.Branches[i].Value; n.zero && l.noZero(t, s.Branches[i].Value) {
			return Choice{}
		}
	}
	t.Rows = ch.Type.Rows
	if s.Unit != nil {
		t.Dim, t.Freq = s.Unit.Dim, NoFreq
		if s.Unit.Quantity == "" {
			t.Freq = freqOf(s.Unit.Unit)
		}
		if t.Kind == Number && s.Unit.Point {
			t.Kind = Point
		}
	}
	ch.Type = t
	return ch
}

func (l *lower) choiceRows(ch *Choice, br *syntax.Branch, out Branch) {
	for _, n := range [...]*Node{out.Value, out.Cond} {
		if n == nil {
			continue
		}
		rows, err := l.e.c.union(ch.Type.Rows, n.Type.Rows)
		if err != nil {
			l.failRows(br.At, err)
			return
		}
		ch.Type.Rows = rows
	}
}

func (l *lower) sameBranch(s *syntax.Definition, br *syntax.Branch, first, n *Node) bool {
	if first.Type.Dim == n.Type.Dim && first.Type.Kind == n.Type.Kind {
		return l.askFreq(br.Value, n, first.Type.Freq, fmt.Sprintf("the first branch of %s is in %s", s.Name.Text, first.Type.Freq.words())).ok()
	}
	l.mismatch(br.Value.Span(), fmt.Sprintf("every branch of %s needs one dimension: the first is %s, but `%s` is %s",
		s.Name.Text, l.e.c.describe(first.Type), l.print(br.Value), l.e.c.describe(n.Type)), first.Type, n.Type)
	return false
}

// noZero reports a literal 0, which fits any dimension, where texts or points of
// temperature stand: 0 is neither.
func (l *lower) noZero(among Type, x syntax.Expr) bool {
	switch among.Kind {
	case Point:
		l.fail(diag.DimensionMismatch, x.Span(), "0 is a plain number, and the others are temperature points", "write `0 degC` or `32 degF`")
	case Text:
		l.fail(diag.DimensionMismatch, x.Span(), "0 is a plain number, and the others are texts", "a text stands in quotes: `\"0\"`")
	default:
		return false
	}
	return true
}

// condition lowers what stands behind `if`, `needs` or `with`.
func (l *lower) condition(x syntax.Expr) *Node {
	n := l.expr(x)
	if n.ok() && n.Type.Kind != Condition {
		return l.fail(diag.Syntax, x.Span(), fmt.Sprintf("a condition compares two values, but `%s` is %s", l.print(x), l.e.c.describe(n.Type)),
			"write for instance `"+l.print(x)+" > 0`")
	}
	return n
}

// whereItems enters the names that `where` takes as plain numbers.
func (l *lower) whereItems(s *syntax.Definition) bool {
	if len(s.Where) == 0 {
		return true
	}
	if s.Unit == nil {
		l.fail(diag.Syntax, s.Name.At, fmt.Sprintf("a rule with `where` gives a plain number, and needs the unit of %s", s.Name.Text),
			fmt.Sprintf("declare it: `%s [N*mm] = …`", s.Name.Text))
		return false
	}
	l.where = map[string]*syntax.UnitRef{}
	for _, w := range s.Where {
		if _, twice := l.where[w.Name.ID]; twice {
			l.fail(diag.Syntax, w.Name.At, fmt.Sprintf("`where` names %s twice", w.Name.Text))
			return false
		}
		found := false
		for i := range s.Branches {
			for _, x := range []syntax.Expr{s.Branches[i].Value, s.Branches[i].Cond} {
				found = found || x != nil && uses(x, w.Name.ID)
			}
		}
		if !found {
			l.fail(diag.UnknownName, w.Name.At, fmt.Sprintf("%s does not stand in the formula that `where` belongs to", w.Name.Text))
			return false
		}
		l.where[w.Name.ID] = w.Unit
	}
	return true
}

func uses(x syntax.Expr, id string) bool {
	found := false
	syntax.Walk(x, func(e syntax.Expr) bool {
		if n, ok := e.(*syntax.Name); ok && n.ID == id {
			found = true
		}
		return !found
	})
	return found
}

// declare holds a value to the unit that its line declares.
func (l *lower) declare(s *syntax.Definition, x syntax.Expr, n *Node) *Node {
	u := s.Unit
	if u == nil {
		return n
	}
	if len(s.Where) > 0 {
		return l.declareWhere(s, x, n)
	}
	if n.zero {
		if u.Point {
			return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("%s is declared in %s, a temperature point, but 0 is a plain number", s.Name.Text, u.Text), "write `0 "+u.Text+"`")
		}
		return n
	}
	found := n.Type
	if found.Kind == Text {
		return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("%s is declared in %s, but %s is a text", s.Name.Text, l.unitWords(u), l.print(x)))
	}
	if found.Dim != u.Dim {
		l.mismatch(x.Span(), fmt.Sprintf("%s is declared in %s, but %s is %s", s.Name.Text, l.unitWords(u), l.print(x), l.e.c.describe(found)),
			Type{Kind: Number, Dim: u.Dim}, found)
		return invalid
	}
	if (found.Kind == Point) != u.Point {
		return l.declaredPoint(s, x, n)
	}
	return l.askFreq(x, n, declaredFreq(u), fmt.Sprintf("%s is declared in %s", s.Name.Text, u.Text))
}

func declaredFreq(u *syntax.UnitRef) Freq {
	if u.Quantity != "" {
		if u.Quantity == "frequency" {
			return Hertz
		}
		return NoFreq
	}
	return freqOf(u.Unit)
}

// askFreq refuses rad/s where Hz or rpm is asked, and the reverse.
func (l *lower) askFreq(x syntax.Expr, n *Node, asked Freq, who string) *Node {
	got := n.Type.Freq
	if asked == NoFreq || got == NoFreq || asked == got {
		return n
	}
	hint := fmt.Sprintf("write `%s/(2*pi)`: a turn has 2π radians", l.print(x))
	if asked == Radians {
		hint = fmt.Sprintf("write `2*pi*%s`: a turn has 2π radians", l.print(x))
	}
	if _, simple := x.(*syntax.Number); simple && asked == Hertz {
		hint = fmt.Sprintf("write `(%s)/(2*pi)`: a turn has 2π radians", l.print(x))
	}
	return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("%s, but `%s` is in %s: they differ by the factor 2π", who, l.print(x), got.words()), hint)
}

func (l *lower) declaredPoint(s *syntax.Definition, x syntax.Expr, n *Node) *Node {
	if n.Type.Kind == Point {
		return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("%s is declared in %s, a temperature difference, but %s is a temperature point", s.Name.Text, s.Unit.Text, l.print(x)),
			"declare it in degC or degF; "+l.asDifference(x))
	}
	unit := "K"
	if s.Unit.Text == "degF" || s.Unit.Text == "°F" {
		unit = "degR"
	}
	return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("%s is declared in %s, a temperature point, but %s is a temperature difference", s.Name.Text, s.Unit.Text, l.print(x)),
		fmt.Sprintf("declare a difference in %s: `%s [%s]`", unit, s.Name.Text, unit))
}

// declareWhere gives the plain number of an empirical rule its declared unit.
func (l *lower) declareWhere(s *syntax.Definition, x syntax.Expr, n *Node) *Node {
	if n.Type.Kind != Number || !n.Type.Dim.IsNumber() {
		return l.fail(diag.DimensionMismatch, x.Span(), fmt.Sprintf("with `where` the formula gives a plain number in %s, but %s is %s", s.Unit.Text, l.print(x), l.e.c.describe(n.Type)),
			everyName)
	}
	t := n.Type
	t.Dim = s.Unit.Dim
	if s.Unit.Point {
		t.Kind = Point
	}
	return l.node(Node{Op: FromUnit, Type: t, Expr: x, Args: l.args(n), Detail: l.detail(Detail{Unit: s.Unit.Unit})})
}

// check lowers a check: one comparison or chain.
func (b *body) check(s *syntax.Check) {
	p := b.plan(s)
	l := b.lower(s.Slots)
	p.Check = l.checkPlan(s.Cond, s.If)
	p.Uses = l.uses
	b.cost += l.cost
	if l.failed {
		b.failed(p, l)
	}
}

func (l *lower) checkPlan(cond, needed syntax.Expr) *CheckPlan {
	out := l.e.c.slabs.checks.One(chunk)
	out.Cond = l.condition(cond)
	if needed != nil {
		out.If = l.condition(needed)
		if out.If.ok() {
			if c, ok := needed.(*syntax.Compare); ok {
				out.IfSides, out.IfOps = out.If.Args, c.Ops
			}
		}
	}
	if !out.Cond.ok() || out.If != nil && !out.If.ok() {
		return out
	}
	if c, ok := unparen(cond).(*syntax.Compare); ok {
		for _, o := range c.Ops {
			if o == syntax.Ne {
				l.fail(diag.Syntax, cond.Span(), "a check compares with <, <=, >, >= or ==")
				return out
			}
		}
		out.Sides, out.Ops = out.Cond.Args, c.Ops
	}
	out.Type = out.Cond.Type
	if out.If != nil {
		rows, err := l.e.c.union(out.Type.Rows, out.If.Type.Rows)
		if err != nil {
			l.failRows(needed.Span(), err)
			return out
		}
		out.Type.Rows = rows
	}
	return out
}

func unparen(x syntax.Expr) syntax.Expr {
	for {
		p, ok := x.(*syntax.Paren)
		if !ok {
			return x
		}
		x = p.X
	}
}

// needs lowers a helper's limit of validity.
func (b *body) needs(s *syntax.Needs) {
	p := b.plan(s)
	l := b.lower(s.Slots)
	p.Check = l.checkPlan(s.Cond, nil)
	p.Check.Warn = s.Warn
	p.Uses = l.uses
	b.cost += l.cost
	if l.failed {
		b.failed(p, l)
	}
}
