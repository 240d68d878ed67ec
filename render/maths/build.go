package maths

import (
	"math"
	"slices"
	"strings"

	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/units"
)

// Builder builds the display trees of expressions: as they were written, and
// with the values put in. It remembers what it has built, so that a value used
// in ten formulas is set once. One goroutine uses it at a time; the trees are
// for everyone.
type Builder struct {
	names     map[string]Node // symbols of what is no step
	units     map[string]Unit
	forms     map[*eval.Step]*forms
	latest    *forms                // asked for
	functions map[string]*eval.Step // the author's own, by name
	chunk     []forms               // room for the next forms
	nodes     []Node                // room for the next rows
	tip       []byte                // room for the tip in the making
	tips      strings.Builder       // the tips, one after another
}

// forms are the ways in which a step has been set.
type forms struct {
	step    *eval.Step
	anchor  string // where it stands, if its step does not say
	plain   Node   // its symbol
	symbol  Node   // its symbol by the name, which leads to where it stands
	name    string
	written Node // its right side
	values  []form
}

// form is an entry of a step's value as it has been set.
type form struct {
	entry         int
	output, value Node // without a link and with one; nil for not yet
	tip           string
}

// chunk is how many forms or nodes room is made for at a time.
const chunk = 64

// NewBuilder returns a builder that has built nothing yet.
func NewBuilder() *Builder {
	return &Builder{
		names:     map[string]Node{},
		units:     map[string]Unit{},
		forms:     map[*eval.Step]*forms{},
		functions: map[string]*eval.Step{},
	}
}

// of returns the forms of a step.
func (b *Builder) of(s *eval.Step) *forms {
	if b.latest != nil && b.latest.step == s {
		return b.latest
	}
	f := b.forms[s]
	if f == nil {
		if len(b.chunk) == 0 {
			b.chunk = make([]forms, chunk)
		}
		f, b.chunk = &b.chunk[0], b.chunk[1:]
		f.step = s
		b.forms[s] = f
	}
	b.latest = f
	return f
}

// at returns the form of an entry of a step's value; it is good until the next
// call for the step.
func (f *forms) at(entry int) *form {
	for i := range f.values {
		if f.values[i].entry == entry {
			return &f.values[i]
		}
	}
	f.values = append(f.values, form{entry: entry})
	return &f.values[len(f.values)-1]
}

// room returns an empty row with room for n nodes.
func (b *Builder) room(n int) Row {
	if len(b.nodes) < n {
		b.nodes = make([]Node, max(n, chunk))
	}
	row := b.nodes[:0:n]
	b.nodes = b.nodes[n:]
	return row
}

// row returns nodes side by side.
func (b *Builder) row(list ...Node) Row { return append(b.room(len(list)), list...) }

// Place tells where a step without an anchor of its own stands on the page.
func (b *Builder) Place(s *eval.Step, anchor string) {
	f := b.of(s)
	f.anchor, f.symbol = anchor, nil
}

// Anchor is where a step stands on the page, "" for nowhere.
func (b *Builder) Anchor(s *eval.Step) string {
	if s.Anchor != "" {
		return s.Anchor
	}
	if f := b.forms[s]; f != nil {
		return f.anchor
	}
	return ""
}

// Define tells of a function of the author's own, which calls of it lead to.
func (b *Builder) Define(s *eval.Step) { b.functions[s.ID] = s }

// Name returns a name as a Symbol. The names before a dot, a schedule's or
// another calc's, stand last in its subscript.
func (b *Builder) Name(name string) Node {
	n := b.names[name]
	if n == nil {
		n = symbol(name)
		b.names[name] = n
	}
	return n
}

func symbol(name string) Symbol {
	var s Symbol
	qualifier, last, dotted := "", name, false
	if i := strings.LastIndexByte(name, '.'); i >= 0 {
		qualifier, last, dotted = name[:i], name[i+1:], true
	}
	parts := syntax.DisplayParts(last)
	if n := len(parts); n > 1 || dotted {
		s.Sub = make([]string, 0, n)
	}
	for i, p := range parts {
		s.Primes += p.Primes
		if i == 0 {
			s.Head = p.Text
		} else if p.Text != "" {
			s.Sub = append(s.Sub, p.Text)
		}
	}
	if dotted {
		for _, p := range syntax.DisplayParts(qualifier) {
			s.Sub = append(s.Sub, p.Text+strings.Repeat("′", p.Primes))
		}
	}
	return s
}

// Symbol returns the symbol of a step, which leads to where it stands.
func (b *Builder) Symbol(s *eval.Step) Node { return b.linked(stepName(s), s) }

// linked is a name of a step as a symbol that leads to where it stands.
func (b *Builder) linked(name string, s *eval.Step) Node {
	f := b.of(s)
	if f.symbol == nil || f.name != name {
		plain := b.Plain(s)
		if name != stepName(s) {
			plain = b.Name(name)
		}
		symbol := plain.(Symbol)
		symbol.Target = b.Anchor(s)
		f.symbol, f.name = symbol, name
	}
	return f.symbol
}

// Plain returns the symbol of a step without a link.
func (b *Builder) Plain(s *eval.Step) Node {
	f := b.of(s)
	if f.plain == nil {
		f.plain = symbol(stepName(s))
	}
	return f.plain
}

func stepName(s *eval.Step) string {
	if s.Symbol == "" {
		return s.ID
	}
	return s.Symbol
}

// Unit returns a unit as it is set.
func (b *Builder) Unit(u units.Unit) Unit {
	text := u.String()
	if text == "" {
		return nil
	}
	if set, ok := b.units[text]; ok {
		return set
	}
	set := Unit(u.Terms())
	b.units[text] = set
	return set
}

// Pieces sets a value as printed; an entry that does not exist is a dash.
func (b *Builder) Pieces(pieces []eval.Piece, ref Ref) Node {
	if len(pieces) == 0 {
		return Text{"–", ref}
	}
	if len(pieces) == 1 {
		return b.piece(pieces[0], ref)
	}
	var row Row
	for i, p := range pieces {
		if i > 0 {
			row = append(row, Blank)
		}
		row = append(row, b.piece(p, ref))
	}
	return row
}

func (b *Builder) piece(p eval.Piece, ref Ref) Node {
	if p.Figures == "" {
		return Text{p.Text, ref}
	}
	return Number{p.Figures, b.Unit(p.Unit), ref}
}

// Value returns an entry of a step's value as printed. It leads to where the
// value was defined and tells how it came about.
func (b *Builder) Value(s *eval.Step, entry int) Node {
	f := b.of(s)
	if n := f.at(entry).value; n != nil {
		return n
	}
	ref := Ref{Target: b.Anchor(s), Tip: b.Tip(s, entry)}
	n := refer(b.Output(s, entry), ref)
	if IsCarried(s) {
		n = Script{Base: n, Sup: Text{Text: CarriedMark}}
	}
	f.at(entry).value = n
	return n
}

// refer gives a printed value something behind it.
func refer(n Node, ref Ref) Node {
	switch n := n.(type) {
	case Number:
		n.Ref = ref
		return n
	case Text:
		n.Ref = ref
		return n
	case Row:
		row := make(Row, len(n))
		for i, c := range n {
			row[i] = refer(c, ref)
		}
		return row
	}
	return n
}

// CarriedMark stands behind a value that was carried from another calc right
// where it is used.
const CarriedMark = "†"

// IsCarried tells whether a value used in a formula comes from another calc
// without a line of its own.
func IsCarried(s *eval.Step) bool { return s.Origin != nil && s.Stmt == nil }

// Output returns an entry of a step's value as printed, without a link.
func (b *Builder) Output(s *eval.Step, entry int) Node {
	f := b.of(s).at(entry)
	if f.output == nil {
		f.output = b.Pieces(s.Printed(entry), Ref{})
	}
	return f.output
}

// Tip is a value's derivation one level deep as plain text:
// `τ = P/(2·A) = 48.89 MPa (1.2)`.
func (b *Builder) Tip(s *eval.Step, entry int) string {
	f := b.of(s)
	if tip := f.at(entry).tip; tip != "" {
		return tip
	}
	t := AppendPlain(b.tip[:0], b.Plain(s))
	if n := b.rightSide(s, entry); n != nil {
		t = append(t, " = "...)
		t = AppendPlain(t, n)
	}
	t = append(t, " = "...)
	t = AppendPlain(t, b.Output(s, entry))
	if mark := s.Value.Type.Mark(entry); mark != "" {
		t = append(append(t, ", "...), mark...)
	}
	if s.Number != "" {
		t = append(append(append(t, " ("...), s.Number...), ')')
	}
	if s.Note != "" {
		t = append(append(t, '\n'), s.Note...)
	}
	if o := s.Origin; o != nil {
		t = append(append(t, "\ncarried from "...), Origin(o)...)
	}
	if s.Source != "" {
		t = append(append(append(t, " ["...), s.Source...), ']')
	}
	b.tip = t
	tip := b.keep(t)
	f.at(entry).tip = tip
	return tip
}

// keep returns a text as a string. Strings share their room.
func (b *Builder) keep(text []byte) string {
	if b.tips.Cap()-b.tips.Len() < len(text) {
		b.tips = strings.Builder{}
		b.tips.Grow(max(len(text), 1<<12))
	}
	from := b.tips.Len()
	b.tips.Write(text)
	return b.tips.String()[from:]
}

// Origin names the calc that a value was carried from: C-101 rev B, Load takedown.
func Origin(o *eval.Origin) string { return o.Name() }

// rightSide is the formula of a step for its tip: of several branches the one
// taken.
func (b *Builder) rightSide(s *eval.Step, entry int) Node {
	d, ok := s.Stmt.(*syntax.Definition)
	if !ok || s.Kind != eval.Computed && s.Kind != eval.Carried || len(d.Branches) == 0 {
		return nil
	}
	if len(d.Branches) == 1 {
		return b.Written(s)
	}
	return b.write(d.Branches[Taken(s, entry)].Value, s)
}

// Taken is the branch that an entry of a step took.
func Taken(s *eval.Step, entry int) int {
	if entry < len(s.Taken) {
		return s.Taken[entry]
	}
	return 0
}

// Written returns the right side of a definition as it was written, a choice
// with its brace; the branch taken by the step's entry is marked.
func (b *Builder) Written(s *eval.Step) Node {
	f := b.of(s)
	if f.written == nil {
		f.written = b.branches(s.Stmt.(*syntax.Definition), s)
	}
	return f.written
}

func (b *Builder) branches(d *syntax.Definition, s *eval.Step) Node {
	if len(d.Branches) == 1 && d.Branches[0].Cond == nil {
		return b.write(d.Branches[0].Value, s)
	}
	choice := Choice{make([]Branch, len(d.Branches))}
	for i, br := range d.Branches {
		set := Branch{Value: b.write(br.Value, s)}
		if br.Cond != nil {
			set.Cond = b.write(br.Cond, s)
		}
		set.Taken = s != nil && s.Kind == eval.Computed && Taken(s, s.Entry) == i
		choice.Branches[i] = set
	}
	return choice
}

// Function returns the right side of a definition that is not computed
// itself, as it was written.
func (b *Builder) Function(d *syntax.Definition, s *eval.Step) Node { return b.branches(d, s) }

// Write returns an expression of a step as it was written.
func (b *Builder) Write(e syntax.Expr, s *eval.Step) Node { return b.write(e, s) }

func (b *Builder) write(e syntax.Expr, s *eval.Step) Node {
	w := &builder{Builder: b, step: s}
	return w.side(e)
}

// Put returns an expression of a step with the values of an entry put in, for
// values of type t; nil where that is no different from how it was written.
func (b *Builder) Put(e syntax.Expr, s *eval.Step, t check.Type, entry int) Node {
	w := &builder{Builder: b, step: s, values: true}
	for i := len(t.Rows) - 1; i >= 0; i-- {
		n := t.Rows[i].N()
		w.at = append(w.at, place{t.Rows[i], entry % n})
		entry /= n
	}
	if d, ok := s.Stmt.(*syntax.Definition); ok {
		w.where = d.Where
	}
	if at, ok := unbracketed(e).(*syntax.AtMark); ok {
		return w.lookup(at)
	}
	n := w.side(e)
	if !w.changed {
		return nil
	}
	return n
}

// builder builds one expression. With values, names become the values that
// they have at the rows of at.
type builder struct {
	*Builder
	step    *eval.Step
	values  bool
	at      []place
	where   []syntax.WhereItem
	changed bool // a value was put in
	inline  int  // inside an exponent: fractions are set with a slash
	depth   int  // inside a fraction: the same
}

// place is a row that is being written out.
type place struct {
	rows  *check.Rows
	index int
}

// used is what a name stands for, nil where nothing is known of it.
func (w *builder) used(n *syntax.Name) *eval.Step {
	if w.step == nil || n.Slot < 0 || n.Slot >= len(w.step.Uses) {
		return nil
	}
	return w.step.Uses[n.Slot]
}

// entry is the entry of a value at the rows being written out, -1 where it has
// rows besides.
func (w *builder) entry(t check.Type) int {
	out := 0
	for _, r := range t.Rows {
		i := w.index(r)
		if i < 0 {
			return -1
		}
		out = out*r.N() + i
	}
	return out
}

// index is the row of a set that is being written out: of a set that is gone
// through twice, within and about a reduction, that of the inner round.
func (w *builder) index(r *check.Rows) int {
	for _, p := range slices.Backward(w.at) {
		if p.rows == r {
			return p.index
		}
	}
	return -1
}

// name sets a name: its symbol, or its value.
func (w *builder) name(n *syntax.Name) Node {
	s := w.used(n)
	if s == nil {
		return w.Name(n.Text)
	}
	if !w.values || n.ID == "pi" && s.Kind == eval.Constant || s.Value.Type.Kind == check.Bundle {
		return w.symbol(n, s)
	}
	entry := w.entry(s.Value.Type)
	if entry < 0 || entry >= s.Value.Len() {
		return w.symbol(n, s)
	}
	w.changed = true
	for _, item := range w.where {
		if item.Name.ID == n.ID && item.Unit != nil {
			return w.measured(s, entry, item.Unit.Unit)
		}
	}
	return w.Value(s, entry)
}

// symbol is a name as a symbol that leads to its definition.
func (w *builder) symbol(n *syntax.Name, s *eval.Step) Node {
	if n.ID == "pi" {
		return w.Name(n.Text)
	}
	return w.linked(n.Text, s)
}

// measured is a value as the plain number of a unit, as an empirical rule takes it.
func (w *builder) measured(s *eval.Step, entry int, u units.Unit) Node {
	pieces := s.Value.Printed(entry, u, s.Figures)
	if own := s.Printed(entry); len(own) == 1 && own[0].Unit.Equal(u) {
		pieces = own
	}
	ref := Ref{Target: w.Anchor(s), Tip: w.Tip(s, entry)}
	if len(pieces) == 1 {
		return Number{Value: pieces[0].Figures, Ref: ref}
	}
	return w.Pieces(pieces, ref)
}

// exists tells whether an entry of a value exists.
func exists(v eval.Value, entry int) bool {
	return entry >= 0 && entry < len(v.Num) && !math.IsNaN(v.Num[entry])
}
