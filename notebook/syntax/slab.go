package syntax

import "gusset/notebook/slab"

// slabs are what a text's nodes come from. size is the length of a chunk, by the
// length of the text: one line does not pay for hundreds of nodes.
type slabs struct {
	size     int
	names    slab.Slab[Name]
	numbers  slab.Slab[Number]
	pieces   slab.Slab[Piece]
	unaries  slab.Slab[Unary]
	binaries slab.Slab[Binary]
	parens   slab.Slab[Paren]
	calls    slab.Slab[Call]
	args     slab.Slab[Arg]
	defs     slab.Slab[Definition]
	branches slab.Slab[Branch]
	unitRefs slab.Slab[UnitRef]

	unitTexts []cachedUnit
}

func newSlabs(length int) *slabs { return &slabs{size: min(max(length/64, 1), 128)} }
