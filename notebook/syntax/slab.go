package syntax

// slab hands out nodes of one kind from chunks, so that a statement costs a
// fraction of an allocation. The chunks live as long as the tree does.
type slab[T any] struct{ free []T }

// take returns n fresh neighbours, with no room behind them.
func (s *slab[T]) take(n, chunk int) []T {
	if len(s.free) < n {
		s.free = make([]T, max(n, chunk))
	}
	got := s.free[:n:n]
	s.free = s.free[n:]
	return got
}

func (s *slab[T]) one(chunk int) *T { return &s.take(1, chunk)[0] }

// slabs are a block's nodes. size is the length of a chunk, by the length of
// the block: a fence of one line does not pay for hundreds of nodes.
type slabs struct {
	size     int
	names    slab[Name]
	numbers  slab[Number]
	pieces   slab[Piece]
	unaries  slab[Unary]
	binaries slab[Binary]
	parens   slab[Paren]
	calls    slab[Call]
	args     slab[Arg]
	defs     slab[Definition]
	branches slab[Branch]
	unitRefs slab[UnitRef]
}
