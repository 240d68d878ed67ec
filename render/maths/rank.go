package maths

import "unicode/utf8"

// The ranks of operators, from the loosest. A line that is too long breaks at
// the loosest operators it has.
const (
	rankWith = iota
	rankOr
	rankAnd
	rankComma
	rankRelation
	rankSum
	rankProduct
	rankBeside
	rankNone
)

// rankOf is the rank at which a line may break before an operator (after it,
// for a comma).
func rankOf(o Op) int {
	switch o.Sign {
	case With.Sign:
		return rankWith
	case "or":
		return rankOr
	case "and":
		return rankAnd
	case "not":
		return rankNone
	case "+", "−":
		return rankSum
	case "·", "×", "/":
		return rankProduct
	case Beside.Sign:
		return rankBeside
	}
	switch o.Class {
	case Rel:
		return rankRelation
	case Punct:
		return rankComma
	case Bin:
		return rankSum
	}
	return rankNone
}

// loosest is the rank of the loosest operator among atoms, the first left out:
// nothing stands before it to break from.
func loosest(list []Node) int {
	rank := rankNone
	prev := Open
	for i, n := range list {
		if o, ok := n.(Op); ok && i > 0 && !signs(o, prev) {
			rank = min(rank, rankOf(o))
		}
		_, prev = n.edges()
	}
	return rank
}

// length is about how many characters wide atoms are.
func length(list []Node) int {
	sum := 0
	for _, n := range list {
		sum += width(n)
	}
	return sum
}

func width(n Node) int {
	switch n := n.(type) {
	case Row:
		return length(n)
	case Symbol:
		w := utf8.RuneCountInString(n.Head) + n.Primes
		for _, p := range n.Sub {
			w += 1 + utf8.RuneCountInString(p)
		}
		return w
	case Number:
		return len(n.Value) + width(n.Unit)
	case Unit:
		w := 0
		for _, t := range n {
			w += 1 + utf8.RuneCountInString(t.Name)
		}
		return w
	case Word:
		return utf8.RuneCountInString(n.Text)
	case Text:
		return utf8.RuneCountInString(n.Text)
	case Op:
		return utf8.RuneCountInString(n.Sign) + 1
	case Fraction:
		return max(width(n.Num), width(n.Den))
	case Script:
		return width(n.Base) + max(width(n.Sub), width(n.Sup))
	case Root:
		return 1 + width(n.Body)
	case Fence:
		return 2 + width(n.Body)
	case Choice:
		w := 0
		for _, b := range n.Branches {
			w = max(w, width(b.Value)+width(b.Cond)+6)
		}
		return w
	}
	return 0
}
