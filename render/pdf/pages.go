package pdf

// slab is the smallest part of a page; it never breaks. Its ink is measured
// from the left edge of the reference column and from below the padding at its
// top edge, the baseline from the edge itself.
type slab struct {
	gap      float64 // space above it, which vanishes at the head of a page
	height   float64
	pad      float64
	baseline float64 // of its first line of text, 0 where it has none
	ink      ink
	bands    []band
	// keep holds it together with the slab below.
	keep bool
	// head is repeated above the slab where that is the first of a page, as a
	// table's head is.
	head    *slab
	anchors []string // ids of the places that it starts
	heading *heading
}

// band is a stripe behind or beside slabs: a check's tint, the bar of a
// quotation. It fills the gap above a slab too, unless it starts there.
type band struct {
	x, width float64
	colour   colour
	starts   bool
}

// heading is a bookmark.
type heading struct {
	text  string
	level int
}

// placed is a slab with the place of its top edge on a page.
type placed struct {
	*slab
	y      float64
	opens  bool // it is the first on its page
	repeat bool // it is a head that is repeated
}

// paginate puts slabs on pages between the body's top edge (which the title
// block lowers on the first page) and the foot. A page ends only where a slab
// is not kept with the next; what is kept together is moved to the next page as
// a whole, unless no page could hold it.
func paginate(slabs []slab, firstTop, top, foot float64) [][]placed {
	b := binder{first: firstTop, top: top, foot: foot}
	b.turn()
	for i := 0; i < len(slabs); {
		n := 1
		for i+n-1 < len(slabs)-1 && slabs[i+n-1].keep {
			n++
		}
		b.chain(slabs[i : i+n])
		i += n
	}
	return b.pages
}

type binder struct {
	first, top, foot float64
	pages            [][]placed
	y                float64
}

func (b *binder) turn() {
	b.pages = append(b.pages, nil)
	b.y = b.top
	if len(b.pages) == 1 {
		b.y = b.first
	}
}

func (b *binder) empty() bool { return len(b.pages[len(b.pages)-1]) == 0 }

func (b *binder) chain(slabs []slab) {
	if !b.empty() && b.y+extent(slabs, false) > b.foot {
		fits := extent(slabs, true) <= b.foot-b.top
		if fits || b.y > b.top+0.75*(b.foot-b.top) {
			b.turn()
		}
	}
	for i := range slabs {
		b.place(&slabs[i])
	}
}

// extent is the height that slabs take, at the head of a page or below others.
func extent(slabs []slab, opens bool) float64 {
	h := 0.0
	for i := range slabs {
		s := &slabs[i]
		if i > 0 || !opens {
			h += s.gap
		} else if s.head != nil {
			h += s.head.height
		}
		h += s.height
	}
	return h
}

func (b *binder) place(s *slab) {
	if !b.empty() && b.y+s.gap+s.height > b.foot {
		b.turn()
	}
	page := &b.pages[len(b.pages)-1]
	opens := len(*page) == 0
	switch {
	case !opens:
		b.y += s.gap
	case s.head != nil:
		*page = append(*page, placed{slab: s.head, y: b.y, opens: true, repeat: true})
		b.y += s.head.height
	}
	*page = append(*page, placed{slab: s, y: b.y, opens: opens})
	b.y += s.height
}
