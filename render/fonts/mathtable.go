package fonts

// Constants are the values of an OpenType MATH table that formulas here are
// set by, in thousandths of an em, but for the percentages.
type Constants struct {
	ScriptPercent       int // size of a script
	ScriptScriptPercent int // size of a script of a script
	AxisHeight          int

	SubscriptShiftDown                  int
	SubscriptTopMax                     int
	SubscriptBaselineDropMin            int
	SuperscriptShiftUp                  int
	SuperscriptShiftUpCramped           int
	SuperscriptBottomMin                int
	SuperscriptBaselineDropMax          int
	SubSuperscriptGapMin                int
	SuperscriptBottomMaxWithSubscript   int
	SpaceAfterScript                    int
	FractionNumeratorShiftUp            int
	FractionNumeratorDisplayShiftUp     int
	FractionDenominatorShiftDown        int
	FractionDenominatorDisplayShiftDown int
	FractionNumeratorGapMin             int
	FractionNumeratorDisplayGapMin      int
	FractionRuleThickness               int
	FractionDenominatorGapMin           int
	FractionDenominatorDisplayGapMin    int
	RadicalGap                          int
	RadicalDisplayGap                   int
	RadicalRuleThickness                int
	RadicalExtraAscender                int
	RadicalKernBeforeDegree             int
	RadicalKernAfterDegree              int
	RadicalDegreeRaisePercent           int
}

// Variant is a taller form of a glyph.
type Variant struct {
	Glyph  uint16
	Height int
}

// Part is one piece of a glyph put together from pieces, listed from below.
type Part struct {
	Glyph      uint16
	Start, End int // how far it may overlap the piece below and above
	Height     int
	Extender   bool // it may be repeated or left out
}

// Growth is how a glyph grows: whole variants from small to tall, and pieces
// for what is taller than the last of them.
type Growth struct {
	Variants []Variant
	Parts    []Part
}

// MathTable is the MATH table of the math face.
type MathTable struct {
	Constants
	MinOverlap int // the least overlap of two pieces
	growth     map[uint16]Growth
}

// Growth returns how a glyph grows upwards; nothing for one that does not.
func (m *MathTable) Growth(glyph uint16) Growth { return m.growth[glyph] }

// MathMetrics returns the MATH table of the face Math.
func MathMetrics() *MathTable { return Math.math() }

// readMath reads a MATH table; a face without one has no constants.
func readMath(b []byte) *MathTable {
	m := &MathTable{growth: map[uint16]Growth{}}
	if b == nil {
		return m
	}
	m.readConstants(b[u16(b[4:]):])
	m.readVariants(b[u16(b[8:]):])
	return m
}

// The constants are four plain words, then values of two words each, then a
// percentage. The numbers below are their places in that list.
func (m *MathTable) readConstants(b []byte) {
	value := func(i int) int { return signed(b[8+4*i:]) }
	m.Constants = Constants{
		ScriptPercent:       signed(b),
		ScriptScriptPercent: signed(b[2:]),
		AxisHeight:          value(1),

		SubscriptShiftDown:                  value(4),
		SubscriptTopMax:                     value(5),
		SubscriptBaselineDropMin:            value(6),
		SuperscriptShiftUp:                  value(7),
		SuperscriptShiftUpCramped:           value(8),
		SuperscriptBottomMin:                value(9),
		SuperscriptBaselineDropMax:          value(10),
		SubSuperscriptGapMin:                value(11),
		SuperscriptBottomMaxWithSubscript:   value(12),
		SpaceAfterScript:                    value(13),
		FractionNumeratorShiftUp:            value(28),
		FractionNumeratorDisplayShiftUp:     value(29),
		FractionDenominatorShiftDown:        value(30),
		FractionDenominatorDisplayShiftDown: value(31),
		FractionNumeratorGapMin:             value(32),
		FractionNumeratorDisplayGapMin:      value(33),
		FractionRuleThickness:               value(34),
		FractionDenominatorGapMin:           value(35),
		FractionDenominatorDisplayGapMin:    value(36),
		RadicalGap:                          value(45),
		RadicalDisplayGap:                   value(46),
		RadicalRuleThickness:                value(47),
		RadicalExtraAscender:                value(48),
		RadicalKernBeforeDegree:             value(49),
		RadicalKernAfterDegree:              value(50),
		RadicalDegreeRaisePercent:           signed(b[8+4*51:]),
	}
}

func (m *MathTable) readVariants(b []byte) {
	m.MinOverlap = u16(b)
	glyphs := coverage(b[u16(b[2:]):])
	for i := range u16(b[6:]) {
		m.growth[glyphs[i]] = construction(b[u16(b[10+2*i:]):])
	}
}

func construction(b []byte) Growth {
	var g Growth
	for i := range u16(b[2:]) {
		v := b[4+4*i:]
		g.Variants = append(g.Variants, Variant{uint16(u16(v)), u16(v[2:])})
	}
	if u16(b) == 0 {
		return g
	}
	assembly := b[u16(b):]
	for i := range u16(assembly[4:]) {
		p := assembly[6+10*i:]
		g.Parts = append(g.Parts, Part{
			Glyph: uint16(u16(p)), Start: u16(p[2:]), End: u16(p[4:]),
			Height: u16(p[6:]), Extender: u16(p[8:])&1 == 1,
		})
	}
	return g
}

// coverage lists the glyphs of a coverage table in its order.
func coverage(b []byte) []uint16 {
	var list []uint16
	for i := range u16(b[2:]) {
		if u16(b) == 1 {
			list = append(list, uint16(u16(b[4+2*i:])))
			continue
		}
		span := b[4+6*i:]
		for g := u16(span); g <= u16(span[2:]); g++ {
			list = append(list, uint16(g))
		}
	}
	return list
}
