package fonts

import (
	"bytes"
	"compress/zlib"
	"encoding/binary"
	"slices"
	"strconv"
	"strings"
)

// mathSigns are the characters that a formula in MathML takes from the math
// face; letters and figures come from the text faces.
const mathSigns = " !%()*+,-./:;<=>[]{|}¬±·×÷′″‖→←⇒∂∏∑−∓∘√∛∝∞∫≈≠≡≤≥⋅⌈⌉⌊⌋"

// mathPart is the math face as a web page gets it: those signs with all the
// sizes they grow to, and the MATH table. The whole face is forty times as
// large. Glyphs keep their numbers, so that the tables which name them stay as
// they are; the glyphs that are left out are empty.
func (f *Face) mathPart() part {
	var ranges []string
	for _, r := range mathSigns {
		ranges = append(ranges, "U+"+strings.ToUpper(strconv.FormatInt(int64(r), 16)))
	}
	return f.part(strings.Join(ranges, ","), "woff", woff(f.subset(mathSigns)))
}

// A fontTable is one table of a TrueType file.
type fontTable struct {
	tag  string
	data []byte
}

// subset returns the tables of a face that keep the glyphs of some characters.
func (f *Face) subset(characters string) []fontTable {
	g := f.glyphs()
	keep := make([]bool, len(g.advances))
	keep[0] = true
	for _, r := range characters {
		f.keep(keep, g.index(r))
	}
	var glyf, hmtx []byte
	loca := make([]byte, 0, 4*len(g.loca))
	source := f.Table("hmtx")
	for i, k := range keep {
		loca = binary.BigEndian.AppendUint32(loca, uint32(len(glyf)))
		if k {
			glyf = append(glyf, g.glyf[g.loca[i]:g.loca[i+1]]...)
			hmtx = append(hmtx, source[4*i:4*i+4]...)
		} else {
			hmtx = append(hmtx, 0, 0, 0, 0)
		}
	}
	loca = binary.BigEndian.AppendUint32(loca, uint32(len(glyf)))
	tables := []fontTable{
		{"cmap", characterTable(g, characters)}, {"glyf", glyf}, {"hmtx", hmtx}, {"loca", loca},
		// version 3: glyphs have no names
		{"post", append([]byte{0, 3, 0, 0}, f.Table("post")[4:32]...)},
	}
	for _, tag := range []string{"MATH", "OS/2", "cvt ", "fpgm", "head", "hhea", "maxp", "name", "prep"} {
		tables = append(tables, fontTable{tag, f.Table(tag)})
	}
	slices.SortFunc(tables, func(a, b fontTable) int { return strings.Compare(a.tag, b.tag) })
	return tables
}

// keep marks a glyph, what it is made of and what it grows to.
func (f *Face) keep(keep []bool, glyph uint16) {
	if keep[glyph] {
		return
	}
	keep[glyph] = true
	growth := f.math().Growth(glyph)
	for _, v := range growth.Variants {
		f.keep(keep, v.Glyph)
	}
	for _, p := range growth.Parts {
		f.keep(keep, p.Glyph)
	}
	for _, c := range f.glyphs().components(glyph) {
		f.keep(keep, c)
	}
}

// components lists the glyphs that a composite glyph is made of.
func (g *glyphs) components(glyph uint16) []uint16 {
	const (
		wordArguments = 1 << 0
		oneScale      = 1 << 3
		more          = 1 << 5
		twoScales     = 1 << 6
		matrix        = 1 << 7
	)
	b := g.glyf[g.loca[glyph]:g.loca[glyph+1]]
	if len(b) == 0 || signed(b) >= 0 {
		return nil
	}
	var list []uint16
	for b = b[10:]; ; {
		flags := u16(b)
		list = append(list, uint16(u16(b[2:])))
		size := 6
		if flags&wordArguments != 0 {
			size += 2
		}
		switch {
		case flags&oneScale != 0:
			size += 2
		case flags&twoScales != 0:
			size += 4
		case flags&matrix != 0:
			size += 8
		}
		if flags&more == 0 {
			return list
		}
		b = b[size:]
	}
}

// characterTable is a cmap of format 12 with a group for each character.
func characterTable(g *glyphs, characters string) []byte {
	list := []rune(characters)
	slices.Sort(list)
	var groups []byte
	count := 0
	for _, r := range list {
		if glyph := g.index(r); glyph != 0 {
			for _, v := range []uint32{uint32(r), uint32(r), uint32(glyph)} {
				groups = binary.BigEndian.AppendUint32(groups, v)
			}
			count++
		}
	}
	b := []byte{0, 0, 0, 1, 0, 3, 0, 10, 0, 0, 0, 12, 0, 12, 0, 0}
	b = binary.BigEndian.AppendUint32(b, uint32(16+len(groups)))
	b = binary.BigEndian.AppendUint32(b, 0)
	b = binary.BigEndian.AppendUint32(b, uint32(count))
	return append(b, groups...)
}

// woff wraps tables, sorted by tag, as a WOFF 1.0 file.
func woff(tables []fontTable) []byte {
	const header, entry = 44, 20
	size := 12 + 16*len(tables) // of the TrueType file it unwraps to
	directory := make([]byte, 0, entry*len(tables))
	var body []byte
	var buffer bytes.Buffer
	packer := zlib.NewWriter(&buffer)
	for _, t := range tables {
		buffer.Reset()
		packer.Reset(&buffer)
		packer.Write(t.data)
		packer.Close() // a buffer does not fail
		packed := buffer.Bytes()
		if len(packed) >= len(t.data) {
			packed = t.data
		}
		directory = append(directory, t.tag...)
		for _, v := range []int{header + entry*len(tables) + len(body), len(packed), len(t.data)} {
			directory = binary.BigEndian.AppendUint32(directory, uint32(v))
		}
		directory = binary.BigEndian.AppendUint32(directory, checksum(t.data))
		body = append(body, packed...)
		for len(body)%4 != 0 {
			body = append(body, 0)
		}
		size += (len(t.data) + 3) &^ 3
	}
	b := []byte("wOFF\x00\x01\x00\x00")
	b = binary.BigEndian.AppendUint32(b, uint32(header+len(directory)+len(body)))
	b = binary.BigEndian.AppendUint16(b, uint16(len(tables)))
	b = append(b, 0, 0)
	b = binary.BigEndian.AppendUint32(b, uint32(size))
	b = append(b, make([]byte, header-len(b))...) // no version, no metadata
	return append(append(b, directory...), body...)
}

func checksum(b []byte) uint32 {
	var sum uint32
	for ; len(b) >= 4; b = b[4:] {
		sum += binary.BigEndian.Uint32(b)
	}
	if len(b) > 0 {
		var last [4]byte
		copy(last[:], b)
		sum += binary.BigEndian.Uint32(last[:])
	}
	return sum
}
