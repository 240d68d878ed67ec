package maths

// The spaces between classes of atoms (Knuth, The TeXbook, chapter 18), the
// left one down, the right one across: 0 none, 1 thin, 2 medium, 3 thick;
// negative ones vanish in scripts. A star there, which cannot come up once
// signs are told from operators, is 0 here.
var spaces = [8][8]int8{
	//        Ord Func Bin Rel Open Close Punct Inner
	Ord:   {0, 1, -2, -3, 0, 0, 0, -1},
	Func:  {1, 1, 0, -3, 0, 0, 0, -1},
	Bin:   {-2, -2, 0, 0, -2, 0, 0, -2},
	Rel:   {-3, -3, 0, 0, -3, 0, 0, -3},
	Open:  {0, 0, 0, 0, 0, 0, 0, 0},
	Close: {0, 1, -2, -3, 0, 0, 0, -1},
	Punct: {-1, -1, 0, -1, -1, -1, -1, -1},
	Inner: {-1, 1, -2, -3, -1, 0, -1, -1},
}

// gap is the space between two atoms in eighteenths of an em.
func gap(left, right Class, script bool) int {
	kind := spaces[left][right]
	if kind < 0 {
		if script {
			return 0
		}
		kind = -kind
	}
	return [...]int{0, 3, 4, 5}[kind]
}
