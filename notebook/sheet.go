package notebook

import (
	"github.com/yuin/goldmark/ast"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/units"
)

// What a compiled calc is made of, under the door's own names.
type (
	Step   = eval.Step
	Value  = eval.Value
	Rows   = check.Rows
	Type   = check.Type
	Plot   = eval.Plot
	Axis   = eval.Axis
	Curve  = eval.Curve
	Figure = eval.Figure
)

// Sheet is a compiled calc file: the prose as goldmark's tree, whose fences of
// ours are FenceNodes and whose values in text are ValueNodes, and beside it
// everything that was computed. A sheet never changes.
//
// The tree holds nothing that a page may not show: no raw HTML, no link that may
// not be followed, no image that cannot be shown. A link's destination is resolved
// and escaped, ready to be printed; an image's is its key in Images. A quote that is
// a remark has lost its leading word, which the page prints with the remark's number.
type Sheet struct {
	Path        string // within the root, slashes
	Source      *diag.Source
	Front       Front
	Doc         ast.Node
	Blocks      []*Block          // by FenceNode.Index
	Refs        []*Ref            // by ValueNode.Index
	Headings    []*Heading        // in order
	Remarks     []*Remark         // in order
	Images      map[string]*Image // by path within the root: those of the prose and the logo
	Steps       []*Step           // every step of the calc's own blocks, in order: the blocks' steps joined
	Diagnostics []diag.Diagnostic
	// Files are the files that it was made from or looked for in vain, within the
	// root, sorted: itself, carried files and theirs, helpers, CSV, images, registers.
	Files []string

	byHeading  map[ast.Node]*Heading
	byRemark   map[ast.Node]*Remark
	picked     map[string]*check.Rows
	order      []*check.Rows
	unreadable error
	// carriedRows names the sets of rows that come from other files.
	carriedRows map[*check.Rows]string
}

// Failed tells whether the calc has errors: then no page is written of it.
func (s *Sheet) Failed() bool { return diag.HasErrors(s.Diagnostics) }

// Unreadable tells why the calc's own file cannot be read, nil where it can.
func (s *Sheet) Unreadable() error { return s.unreadable }

// HeadingOf returns what is known of a heading of the tree.
func (s *Sheet) HeadingOf(n ast.Node) *Heading { return s.byHeading[n] }

// RemarkOf returns the remark a block quote of the tree is, nil where it is an ordinary quote.
func (s *Sheet) RemarkOf(n ast.Node) *Remark { return s.byRemark[n] }

// Front is the front matter, what the register sets for all its calcs filled in.
type Front struct {
	Calc, Title, Project, Client, Firm, Job, Rev, Status, Date string
	By, Checked, Approved                                      Person
	Logo                                                       string // an image, within the root; "" for none
	Paper                                                      string // "A4" or "Letter"
	Printing                                                   units.Printing
	From                                                       []Link // carried files, in order
	Helpers                                                    []Link // helper files, in order
}

// Person is who prepared, checked or approved, and when.
type Person struct{ Name, Date string }

// Link is a file named in the front matter under a key.
type Link struct {
	Key, Path string // Path is within the root; "" where there is none, which has been reported
	At        diag.Span
	keyAt     diag.Span
}

// Block is a fence of ours with its steps.
type Block struct {
	Kind   syntax.BlockKind
	Tree   *syntax.Block
	Brief  bool
	Full   bool
	Name   string // of a schedule, cases or helper
	Note   string
	Source string
	Number string // of a figure or plot: "1", "2", …
	Anchor string
	Steps  []*Step // calc: the lines; schedule and cases: one for each column
	Rows   *Rows   // schedule and cases
	Marks  int     // index of the column of marks, -1 where there is none
	Plot   *Plot
	Figure *Figure
}

// Ref is a value named in text, resolved.
type Ref struct {
	Step  *Step // nil where it failed
	Unit  units.Unit
	Text  string // plain text as printed: `48.89 MPa`, or for rows the range and the governing mark
	Parts []RefPart
}

// RefPart is a printed value of a Ref with the words around it.
type RefPart struct {
	Words  string
	Pieces []eval.Piece
}

// Heading is a heading of the prose with its number and anchor.
type Heading struct {
	Node   ast.Node
	Level  int    // 1 for the outermost level in use
	Number string // "1", "1.2"
	Text   string // plain
	Anchor string
	Line   int
}

// Remark is a block quote that is collected.
type Remark struct {
	Node   ast.Node
	Kind   RemarkKind
	Number string // "A1", "H1"; "" for cautions and notes
	Text   string // plain, without the leading word
	Anchor string
	Line   int
}

// RemarkKind is the leading word of a remark.
type RemarkKind string

// The remarks that are collected.
const (
	Assumption RemarkKind = "Assumption"
	Caution    RemarkKind = "Caution"
	Hold       RemarkKind = "Hold"
	Note       RemarkKind = "Note"
)
