package fonts

import "encoding/binary"

// glyphs is what a TrueType file says of its glyphs. All embedded faces have
// 1,000 units to the em, so units are thousandths of it.
type glyphs struct {
	pages    [256]*[256]uint16 // character to glyph, by the two bytes of it
	advances []uint16
	glyf     []byte
	loca     []uint32
}

func (g *glyphs) index(r rune) uint16 {
	if r < 0 || r > 0xFFFF || g.pages[r>>8] == nil {
		return 0
	}
	return g.pages[r>>8][r&0xFF]
}

func (g *glyphs) bounds(glyph uint16) (xMin, yMin, xMax, yMax int) {
	if int(glyph)+1 >= len(g.loca) || g.loca[glyph] == g.loca[glyph+1] {
		return 0, 0, 0, 0
	}
	b := g.glyf[g.loca[glyph]:]
	return signed(b[2:]), signed(b[4:]), signed(b[6:]), signed(b[8:])
}

func u16(b []byte) int    { return int(binary.BigEndian.Uint16(b)) }
func u32(b []byte) int    { return int(binary.BigEndian.Uint32(b)) }
func signed(b []byte) int { return int(int16(binary.BigEndian.Uint16(b))) }

// table finds a table of a TrueType file by its tag.
func table(ttf []byte, tag string) []byte {
	for i := range u16(ttf[4:]) {
		entry := ttf[12+16*i:]
		if string(entry[:4]) == tag {
			from := u32(entry[8:])
			return ttf[from : from+u32(entry[12:])]
		}
	}
	return nil
}

func readGlyphs(ttf []byte) *glyphs {
	count := u16(table(ttf, "maxp")[4:])
	g := &glyphs{
		advances: make([]uint16, count),
		glyf:     table(ttf, "glyf"),
		loca:     make([]uint32, count+1),
	}
	hmtx := table(ttf, "hmtx")
	metrics := u16(table(ttf, "hhea")[34:])
	for i := range count {
		g.advances[i] = uint16(u16(hmtx[4*min(i, metrics-1):]))
	}
	loca := table(ttf, "loca")
	long := u16(table(ttf, "head")[50:]) == 1
	for i := range g.loca {
		if long {
			g.loca[i] = uint32(u32(loca[4*i:]))
		} else {
			g.loca[i] = uint32(2 * u16(loca[2*i:]))
		}
	}
	g.readCharacters(table(ttf, "cmap"))
	return g
}

// readCharacters reads the subtable of format 4 for the characters up to
// U+FFFF, which all embedded faces have.
func (g *glyphs) readCharacters(cmap []byte) {
	for i := range u16(cmap[2:]) {
		entry := cmap[4+8*i:]
		sub := cmap[u32(entry[4:]):]
		if u16(entry) == 3 && u16(entry[2:]) == 1 && u16(sub) == 4 {
			g.readSegments(sub)
			return
		}
	}
}

func (g *glyphs) readSegments(sub []byte) {
	twice := u16(sub[6:]) // twice the number of segments
	ends, starts := sub[14:], sub[16+twice:]
	deltas, offsets := sub[16+2*twice:], sub[16+3*twice:]
	for i := 0; i < twice; i += 2 {
		offset := u16(offsets[i:])
		for c := u16(starts[i:]); c <= u16(ends[i:]) && c < 0xFFFF; c++ {
			glyph := c
			if offset != 0 {
				glyph = u16(offsets[i+offset+2*(c-u16(starts[i:])):])
				if glyph == 0 {
					continue
				}
			}
			g.set(rune(c), uint16(glyph+u16(deltas[i:])))
		}
	}
}

func (g *glyphs) set(r rune, glyph uint16) {
	if glyph == 0 {
		return
	}
	if g.pages[r>>8] == nil {
		g.pages[r>>8] = new([256]uint16)
	}
	g.pages[r>>8][r&0xFF] = glyph
}
