// Package slab allocates many small values of one type in few pieces of memory:
//
//	var nodes slab.Slab[Node]
//	n := nodes.One(64)
//
// It is for trees that live and die as a whole, since one value in use keeps
// its whole piece.
package slab

// Slab hands out values of one type from chunks. The zero value is ready.
type Slab[T any] struct{ free []T }

// Take returns n fresh neighbours, with no room behind them. Where a new chunk is
// needed it has room for chunk values.
func (s *Slab[T]) Take(n, chunk int) []T {
	if len(s.free) < n {
		s.free = make([]T, max(n, chunk))
	}
	got := s.free[:n:n]
	s.free = s.free[n:]
	return got
}

// One returns one fresh value.
func (s *Slab[T]) One(chunk int) *T { return &s.Take(1, chunk)[0] }
