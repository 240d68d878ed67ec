package diag

import "strings"

// Nearest returns the candidate that a misspelled word most likely meant, ""
// where none is near: at most two edits away, one for a
// short word, and for a single letter only its other case. Of
// equally near ones the first wins.
func Nearest(word string, candidates []string) string {
	bound := 2
	switch n := len(word); {
	case n <= 1:
		bound = 0 // any other letter would be as near
	case n <= 3:
		bound = 1
	}
	best, distance := "", bound+1
	for _, c := range candidates {
		if c == word || abs(len(c)-len(word)) > bound {
			continue
		}
		d := edits(strings.ToLower(word), strings.ToLower(c), distance)
		if d < distance {
			best, distance = c, d
		}
	}
	return best
}

func abs(n int) int {
	if n < 0 {
		return -n
	}
	return n
}

// edits is the edit distance of two words, a swap of neighbours counting as
// one; it stops at the bound. Words longer than 64 bytes are not compared.
func edits(a, b string, bound int) int {
	if len(a) > 64 || len(b) > 64 {
		return bound
	}
	prev2, prev, row := make([]int, len(b)+1), make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range prev {
		prev[j] = j
	}
	for i := 1; i <= len(a); i++ {
		row[0] = i
		least := i
		for j := 1; j <= len(b); j++ {
			cost := 1
			if a[i-1] == b[j-1] {
				cost = 0
			}
			row[j] = min(prev[j]+1, row[j-1]+1, prev[j-1]+cost)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				row[j] = min(row[j], prev2[j-2]+1)
			}
			least = min(least, row[j])
		}
		if least >= bound {
			return bound
		}
		prev2, prev, row = prev, row, prev2
	}
	return prev[len(b)]
}

// Looks counts the names that are looked through for what messages offer, over
// all messages of a file: a file of nothing but mistakes takes no longer than
// another. Beyond a million nothing is offered.
type Looks struct{ names int }

// May counts some names more, and tells whether a message may look through them.
func (l *Looks) May(names int) bool {
	l.names += names
	return l.names <= 1_000_000
}
