package pdf

const mm = 72 / 25.4

// paper is the geometry of a sheet in points. From left to right it has the
// columns of a calculation pad: reference, calculation, output. Positions
// across a page are measured from the left edge of the reference column.
type paper struct {
	name          string // as the library names it
	width, height float64
}

// paperOf returns the paper of a name in the front matter.
func paperOf(name string) paper {
	if name == "Letter" {
		return paper{"letter", 612, 792}
	}
	return paper{"a4", 595.28, 841.89}
}

// The margins and columns of the sheet, and the distances within the columns.
const (
	sideMargin   = 12 * mm
	topMargin    = 12 * mm
	bottomMargin = 14 * mm

	referenceWidth = 27 * mm
	outputWidth    = 31 * mm
	referencePad   = 2.5 * mm // right of a reference
	calculationPad = 5 * mm   // both sides of the calculation
	outputPad      = 3 * mm   // left of an output
)

// inner is the width of the sheet between its margins.
func (p paper) inner() float64 { return p.width - 2*sideMargin }

// calculation returns the place and width of the text in the middle column.
func (p paper) calculation() (x, width float64) {
	x = referenceWidth + calculationPad
	return x, p.inner() - outputWidth - calculationPad - x
}

// output returns the place and width of the text in the right column.
func (p paper) output() (x, width float64) {
	return p.inner() - outputWidth + outputPad, outputWidth - outputPad
}

// foot is the lowest place of a page that is written on.
func (p paper) foot() float64 { return p.height - bottomMargin }
