// Package render decides what a compiled calc prints. NewPage turns a sheet
// into a Page: the title block, the state box, the entries of every block with
// their formulas as display trees, and the closing lists. The writers of HTML
// and PDF draw a page and decide nothing about its content, so that they cannot
// differ; between the blocks they walk the sheet's prose.
//
// A page has three columns: reference (equation numbers and sources),
// calculation, and output.
package render

import (
	"gusset/notebook"
	"gusset/render/figure"
	"gusset/render/maths"
)

// Page is everything that a calc prints but its prose, which the writers
// take from Sheet.Doc. A page never changes.
type Page struct {
	Sheet  *notebook.Sheet
	Title  Title
	State  State
	Blocks [][]Entry // by FenceNode.Index
	Values []Text    // by ValueNode.Index
	Lists  Lists
}

// Title is the title block.
type Title struct {
	Title string // the calc's title, else its number
	Under string // project · job · client, on one line
	Firm  string
	Logo  string // an image, within the root; "" for none
	Paper string // "A4" or "Letter"
	// Cells stand beside the title in two rows of four. The last one's text is
	// empty: the sheet's number on paper, nothing on a screen.
	Cells [8]Cell
}

// Cell is one cell of the title block: "Prepared", "KT", "2026-03-02".
type Cell struct{ Label, Text, Date string }

// State is the box under the title block.
type State struct {
	Checks, NG, NotRequired, Holds, Assumptions int
	Worst                                       *Summary // the check closest to its limit or furthest beyond; nil where there is none
}

// Kind is what an entry is.
type Kind int

// The kinds of entries.
const (
	Line       Kind = iota // a given, carried or brief value: `P = 48 kN` with its note beside
	Formula                // note, then symbol = formula = substituted, and the output
	Check                  // the same on a band, with a verdict
	NoteLine               // a line that is only a note
	Gap                    // space between groups of lines
	Definition             // a function of the author's own: its formula, without numbers
	HelperHead             // the head of a helper's lines: its title (Note) and its arguments or its signature (Formula)
	Limit                  // a limit of validity that a helper was held to
	Tabular                // nothing but Tables (and a Note as caption): schedules, and values over rows
	DrawingOf              // a plot or a figure
)

// Entry is one line of a block: what stands in each of the three columns.
// Fields that do not apply are zero.
type Entry struct {
	Kind   Kind
	Indent int    // steps to the right, 1 and more inside a helper
	Anchor string // its id on the page

	// The reference column: the equation number in brackets, then a line for
	// each reference.
	Number string // "1.4"
	Refs   []Ref

	// The calculation column, from top to bottom. Note stands beside the formula
	// for a Line, else above it.
	Note    string
	Formula maths.Chain
	Below   []Phrase // small lines below the formula
	Trials  []Trial  // what `first of` tried
	Tables  []*Table
	Drawing *Drawing

	// The output column: a value (or a check's verdict) and, for one of many
	// entries, its mark.
	Output  maths.Node
	Mark    string
	Verdict *Verdict
}

// Ref is a line of the reference column. Target is an id on the page that it
// leads to, "" for none.
type Ref struct{ Text, Target string }

// Phrase is a formula in a sentence. Any part may be empty.
type Phrase struct {
	Before  string
	Formula maths.Chain
	After   string
}

// Trial is a candidate of `first of`: its value, the mark of its row, and how
// the condition came out.
type Trial struct {
	Value, Mark, Why string
	OK               bool
}

// Verdict is how a check came out.
type Verdict struct {
	OK, Required bool
	Ratio        float64 // NaN where there is none
	Utilisation  string  // "0.36", "1.00, equal", "" where there is none
	Word         string  // "OK", "NG", "not required"
}

// BarTick is where, along a bar, its tick stands: the place of 1.0.
const BarTick = 0.8

// Bar returns how much of the bar is filled, from 0 to 1, and whether the ratio
// goes beyond its end. ok is false where the verdict has no ratio.
func (v *Verdict) Bar() (fill float64, beyond, ok bool) {
	if v == nil || !v.Required || v.Utilisation == "" {
		return 0, false, false
	}
	fill = max(v.Ratio*BarTick, 0)
	return min(fill, 1), fill > 1, true
}

// Text is a value in prose: printed numbers with the words around them.
type Text []TextPart

// TextPart is words or a value.
type TextPart struct {
	Words string
	Value maths.Node // a maths.Number, a maths.Text, or a row of them; nil for words
}

// Drawing is a plot or a figure with its caption.
type Drawing struct {
	Number  string // "1"
	Caption string
	Art     *figure.Drawing
}

// Lists are the closing lists; one that is empty is not printed.
type Lists struct {
	Checks      []Summary // NG first, then by ratio, those without, those not required
	Unsourced   []Unsourced
	Assumptions []*notebook.Remark
	Holds       []*notebook.Remark
	Symbols     []SymbolLine
	Sources     []SourceLine
	Cautions    []CautionLine
	Notes       []string // the standing notes
}

// Summary is a check in the summary.
type Summary struct {
	Number, Anchor, Note string
	Formula              maths.Chain // symbols only
	Mark                 string      // the governing entry
	Verdict              *Verdict
	Reason               []Phrase // why it is not required
}

// Unsourced is a given without a source.
type Unsourced struct {
	Symbol maths.Node
	Anchor string
	Value  maths.Node // nil for a schedule
	Note   string
}

// SymbolLine explains a symbol.
type SymbolLine struct {
	Symbol  maths.Node
	Unit    maths.Unit
	Meaning string
	Where   string // "(1.2)" or the section, "1"
	Anchor  string
}

// SourceLine is a source cited, with what rests on it.
type SourceLine struct {
	Source string
	On     []Resting
}

// Resting is a value or a numbered line that rests on a source.
type Resting struct {
	Symbol maths.Node // a given's symbol; nil where Number is meant
	Number string     // "(1.4)"
	Anchor string
}

// CautionLine is a helper's caution, printed once, with the helpers that bear it.
type CautionLine struct {
	Number, Anchor string // "C1"
	Text           string
	Helpers        []string
}
