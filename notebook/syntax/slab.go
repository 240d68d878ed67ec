package syntax

import "gusset/notebook/slab"

// slabs are a block's nodes. size is the length of a chunk, by the length of
// the block: a fence of one line does not pay for hundreds of nodes.
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
}
