package maths

import "gusset/units"

// Node is one part of a formula: Row, Symbol, Number, Unit, Word, Text, Op,
// Space, Fraction, Script, Root, Fence or Choice. The set is closed, and nil
// stands for nothing at all.
type Node interface {
	// edges are the classes that a neighbour on either side sees.
	edges() (left, right Class)
}

// Class is the class of an atom of a formula, as TeX has it.
type Class uint8

const (
	Ord   Class = iota // a letter, a number, anything bracketed
	Func               // a function's name, and not
	Bin                // a binary operator: + · ×
	Rel                // a relation: = ≤, and the words and, or
	Open               // an opening bracket
	Close              // a closing bracket
	Punct              // a comma
	Inner              // a fraction
)

// Ref is what a reader finds behind a symbol or a value.
type Ref struct {
	Target string // id of the place it leads to, without #; empty for none
	Tip    string // plain text shown while it is pointed at or has the focus
	// Governs marks the entry that decides; it is set semi-bold.
	Governs bool
}

// leads reports whether a reference is a link on the page.
func (r Ref) leads() bool { return r.Target != "" || r.Tip != "" }

// Row is a sequence of nodes side by side. Rows in rows are allowed and are
// spaced as if they were one.
type Row []Node

// Symbol is a quantity's name: an italic head with upright subscripts that
// are set apart by commas, and primes. Greek letters are given as letters.
type Symbol struct {
	Head   string
	Sub    []string
	Primes int
	Ref
}

// Number is a value as figures, such as -6.036e-4 or 1 1/4, and its unit, if
// any. A leading hyphen is printed as a true minus, an exponent as ×10ⁿ.
type Number struct {
	Value string
	Unit  Unit
	Ref
}

// Unit is a unit's factors in the order they are written, as units.Unit.Terms
// gives them. As a node it is a unit that stands alone.
type Unit []units.Term

// Word is upright text of the formula's own language: a function's name, and not
// (followed by its bracket) or a word like otherwise.
type Word struct {
	Text string
	Ref
}

// Text is a text value, upright, printed as given.
type Text struct {
	Text string
	Ref
}

// Op is an operator, a relation or a punctuation mark.
type Op struct {
	Sign  string // "+", "−", "·", "=", "≤", ",", "and", …
	Class Class
}

// The operators that formulas are made of.
var (
	Plus   = Op{"+", Bin}
	Minus  = Op{"−", Bin} // between two terms, or before one
	Dot    = Op{"·", Bin} // a written multiplication
	Cross  = Op{"×", Bin}
	Slash  = Op{"/", Ord}      // division within the line
	Beside = Op{"\u2062", Ord} // a multiplication that is not written
	Comma  = Op{",", Punct}
	And    = Op{"and", Rel}
	Or     = Op{"or", Rel}
	Not    = Op{"not", Func}
	With   = Op{"with", Rel}
)

// The operators as nodes, so that a formula need not make them.
var (
	plus, minus, dot Node = Plus, Minus, Dot
	slash, beside    Node = Slash, Beside
	comma            Node = Comma
	and, or, not     Node = And, Or, Not
	with             Node = With
	equals           Node = Op{"=", Rel}
	atMost, atLeast  Node = Op{"≤", Rel}, Op{"≥", Rel}
)

// relation is Relation as a node.
func relation(sign string) Node {
	switch sign {
	case "=", "==":
		return equals
	case "<=":
		return atMost
	case ">=":
		return atLeast
	}
	return Relation(sign)
}

// Relation returns the operator for a relation in its typeset or its ASCII
// spelling.
func Relation(sign string) Op {
	switch sign {
	case "<=":
		sign = "≤"
	case ">=":
		sign = "≥"
	case "!=":
		sign = "≠"
	case "==":
		sign = "="
	}
	return Op{sign, Rel}
}

// Space is a blank of so many eighteenths of an em.
type Space int

// Thin stands between figures and what belongs to them, Blank between words,
// Wide between figures and a unit that starts with one, Quad between statements.
const (
	Thin  Space = 3
	Blank Space = 5
	Wide  Space = 7
	Quad  Space = 18
)

// Fraction is a numerator over a denominator. Neither needs brackets.
type Fraction struct{ Num, Den Node }

// Script is a base with a subscript, a superscript or both; either may be nil.
// A base that is more than a symbol, a plain number or a function's name comes
// in a Fence.
type Script struct{ Base, Sub, Sup Node }

// Root is a square root, or the root of an index.
type Root struct{ Body, Index Node }

// Fence is a body between brackets that grow with it. Either bracket may be
// empty; | stands for itself on both sides.
type Fence struct {
	Open  string
	Body  Node
	Close string
}

// strut is what one bracket of a pair that is parted from the other grows to,
// in ems above and below the baseline.
type strut struct{ up, down float64 }

// Choice is a value by condition: a brace before the branches.
type Choice struct{ Branches []Branch }

// Branch is one line of a choice: Value if Cond, or Value otherwise where Cond
// is nil. The branch whose value was used is Taken.
type Branch struct {
	Value, Cond Node
	Taken       bool
}

// Chain is a formula with its relations: left = right = right ≤ right. It is
// what lines break in: before relations first, then before operators.
type Chain struct {
	Left  Node // nil where the chain starts with a relation
	Steps []Step
}

// Step is one relation of a chain and what stands to its right.
type Step struct {
	Sign  string // as Relation takes it
	Right Node
}

// Paren puts round brackets about a node.
func Paren(n Node) Fence { return Fence{"(", n, ")"} }

// Abs puts bars about a node.
func Abs(n Node) Fence { return Fence{"|", n, "|"} }

// Call is a function's name with its arguments in brackets.
func Call(name Node, args ...Node) Row {
	body := make(Row, 0, 2*len(args))
	for i, a := range args {
		if i > 0 {
			body = append(body, comma)
		}
		body = append(body, a)
	}
	return Row{name, Paren(body)}
}

func ordinary() (Class, Class) { return Ord, Ord }

func (Row) edges() (left, right Class)    { return ordinary() }
func (Symbol) edges() (left, right Class) { return ordinary() }
func (Number) edges() (left, right Class) { return ordinary() }
func (Unit) edges() (left, right Class)   { return ordinary() }
func (Text) edges() (left, right Class)   { return ordinary() }
func (Root) edges() (left, right Class)   { return ordinary() }
func (strut) edges() (left, right Class)  { return ordinary() }

func (Word) edges() (left, right Class)     { return Func, Func }
func (Fraction) edges() (left, right Class) { return Inner, Inner }
func (Choice) edges() (left, right Class)   { return Inner, Inner }

// A blank is all the space there is on either side of it.
func (Space) edges() (left, right Class) { return Close, Open }

func (o Op) edges() (left, right Class) {
	if o.Sign == Beside.Sign {
		return Close, Open
	}
	return o.Class, o.Class
}

func (s Script) edges() (left, right Class) {
	if s.Base == nil {
		return ordinary()
	}
	return s.Base.edges()
}

func (f Fence) edges() (left, right Class) {
	left, right = Open, Close
	if _, ok := f.Body.(strut); ok { // one bracket alone
		if f.Close == "" {
			return Open, Open
		}
		return Close, Close
	}
	if f.Open == "" {
		left = Ord
	}
	if f.Close == "" {
		right = Ord
	}
	return left, right
}

// atoms appends the atoms of a node to dst: rows in rows are opened, and nil
// is left out.
func atoms(dst []Node, n Node) []Node {
	switch n := n.(type) {
	case nil:
		return dst
	case Row:
		for _, c := range n {
			dst = atoms(dst, c)
		}
		return dst
	}
	return append(dst, n)
}

// signs reports whether an operator that follows an atom of right class prev
// is a sign and not a binary operator; at the start of a row prev is Open.
func signs(o Op, prev Class) bool {
	if o.Class != Bin {
		return false
	}
	switch prev {
	case Open, Bin, Rel, Punct, Func:
		return true
	}
	return false
}

// endsInChoice reports whether the last atom of a node is a choice.
func endsInChoice(n Node) bool {
	switch n := n.(type) {
	case Choice:
		return true
	case Row:
		return len(n) > 0 && endsInChoice(n[len(n)-1])
	}
	return false
}
