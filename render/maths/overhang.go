package maths

// overhang is how far, in thousandths of an em, the last letter of an italic
// name leans out over the room it takes.
func overhang(letters string) int { return 0 }
