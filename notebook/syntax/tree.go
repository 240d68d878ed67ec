package syntax

import (
	"gusset/notebook/diag"
	"gusset/units"
)

// Expr is an expression. The tree is immutable once parsed; what later phases
// find out about it stands in tables of their own.
type Expr interface{ Span() diag.Span }

// Name is a value's name where it is used or defined, dots included
// (`bolts.x`, `loads.P_u`): ID is its English spelling (`tau_d` for `τ_d`),
// Text the author's own. Slot numbers the names used within one statement, in
// source order from 0, so that later phases keep what a name stands for in a
// slice; it is -1 for a name that is defined, not used.
type Name struct {
	At   diag.Span
	ID   string
	Text string
	Slot int
}

// Number is a literal with its unit. A plain literal has one piece, a falling
// compound (`12 ft 6 in`) several. Neg is set only where the sign belongs to
// the literal (`-40 degC`); elsewhere a sign is a Unary.
type Number struct {
	At     diag.Span
	Neg    bool
	Pieces []Piece
}

// Piece is one number of a literal and its unit. Figures are the author's
// own (`1 1/4`, `12_500`, `1.2e-3`). Touch tells that the unit touches the figures (`48kN`).
// HasUnit is false for a bare number.
type Piece struct {
	Figures string
	Unit    units.Unit
	HasUnit bool
	Touch   bool
	At      diag.Span // the figures
	UnitAt  diag.Span
}

// Text is a quoted text; Value is without the quotes.
type Text struct {
	At    diag.Span
	Value string
}

// Op is an operator.
type Op int

// The operators, arithmetic, comparing and logical.
const (
	Add Op = iota
	Sub
	Mul
	Div
	Pow
	Neg
	Lt
	Le
	Gt
	Ge
	Eq
	Ne
	And
	Or
	Not
)

// String returns the operator's plain spelling.
func (o Op) String() string {
	return [...]string{"+", "-", "*", "/", "^", "-", "<", "<=", ">", ">=", "==", "!=", "and", "or", "not"}[o]
}

// Unary is `-x` or `not x`.
type Unary struct {
	At diag.Span
	Op Op
	X  Expr
}

// Binary is an arithmetic operation, or `and` and `or`.
type Binary struct {
	At   diag.Span
	Op   Op
	OpAt diag.Span
	X, Y Expr
}

// Compare is a chain of one or more comparisons: len(Operands) is len(Ops)+1.
type Compare struct {
	At       diag.Span
	Operands []Expr
	Ops      []Op
	OpsAt    []diag.Span
}

// Paren is an expression in brackets of the author's.
type Paren struct {
	At diag.Span
	X  Expr
}

// Call is a call of a function or a helper. At spans the name to the closing bracket.
type Call struct {
	At   diag.Span
	Fun  *Name
	Args []Arg
}

// Arg is one argument: Name is nil where it goes by position, Over is nil
// but in a reduction that names its rows (`max(F over bolts)`).
type Arg struct {
	Name  *Name
	Value Expr
	Over  *Name
}

// AtMark is `steels.f_y at grade`.
type AtMark struct {
	At   diag.Span
	OpAt diag.Span
	X, Y Expr
}

// FirstOf is `first of v1, v2, … with condition`; it stands only as the whole
// right side of a definition. In Cond the defined name stands for the candidate.
type FirstOf struct {
	At     diag.Span
	Values []Expr
	Cond   Expr
}

// Bad stands where an expression could not be read.
type Bad struct{ At diag.Span }

// Span returns the source range of an expression.
func (n *Name) Span() diag.Span    { return n.At }
func (n *Number) Span() diag.Span  { return n.At }
func (n *Text) Span() diag.Span    { return n.At }
func (n *Unary) Span() diag.Span   { return n.At }
func (n *Binary) Span() diag.Span  { return n.At }
func (n *Compare) Span() diag.Span { return n.At }
func (n *Paren) Span() diag.Span   { return n.At }
func (n *Call) Span() diag.Span    { return n.At }
func (n *AtMark) Span() diag.Span  { return n.At }
func (n *FirstOf) Span() diag.Span { return n.At }
func (n *Bad) Span() diag.Span     { return n.At }

// Stmt is a statement of a calc or helper block.
type Stmt interface{ Span() diag.Span }

// Note is what stands behind `#`: what the line is, and where it comes from.
type Note struct {
	At       diag.Span
	Text     string
	Source   string // without its brackets, "" where there is none
	SourceAt diag.Span
}

// UnitRef is a declared unit `[MPa]`, or in a parameter a quantity's name
// (`[force]`, `[column of length]`): then Quantity is set and Dim holds its dimension.
type UnitRef struct {
	At       diag.Span // with the brackets
	Unit     units.Unit
	Text     string // as written, without brackets and blanks around
	Quantity string
	Dim      units.Dimension
	Point    bool // a temperature point
	Column   bool // `column of …`
}

// Definition is `name [unit] = …` with its branches, or with parameters a
// function of the author's own.
type Definition struct {
	At       diag.Span
	Name     *Name
	Func     bool // defined with parameters, possibly none between the brackets
	Params   []*Name
	Unit     *UnitRef // nil where none is declared
	Branches []Branch
	Where    []WhereItem
	Note     Note
	Slots    int // how many names are used on the right side
}

// Branch is one right side. A plain definition has one branch with neither
// condition nor otherwise.
type Branch struct {
	At        diag.Span
	Value     Expr
	Cond      Expr // nil where there is none
	Otherwise bool
	Note      Note // of the branch's own line, where the definition has its note from another
}

// WhereItem is one `f_u [MPa]` behind `where`.
type WhereItem struct {
	Name *Name // Slot -1
	Unit *UnitRef
}

// Check is `check condition if condition`.
type Check struct {
	At    diag.Span
	Cond  Expr
	If    Expr // nil where the check is always required
	Note  Note
	Slots int
}

// NoteLine is a line that is only a note.
type NoteLine struct {
	At   diag.Span
	Note Note
}

// Gap is one or more blank lines between statements.
type Gap struct{ At diag.Span }

// Needs is a helper's limit of validity: `needs condition`, with Warn where
// `else warn` follows.
type Needs struct {
	At    diag.Span
	Cond  Expr
	Warn  bool
	Note  Note
	Slots int
}

// Gives names a helper's results.
type Gives struct {
	At    diag.Span
	Names []*Name // Slot -1
}

// BadStmt stands where a line could not be read. Name is the name it was
// about to define, where that much could be made out, else nil.
type BadStmt struct {
	At   diag.Span
	Name *Name
}

// Span returns the source range of a statement.
func (s *Definition) Span() diag.Span { return s.At }
func (s *Check) Span() diag.Span      { return s.At }
func (s *NoteLine) Span() diag.Span   { return s.At }
func (s *Gap) Span() diag.Span        { return s.At }
func (s *Needs) Span() diag.Span      { return s.At }
func (s *Gives) Span() diag.Span      { return s.At }
func (s *BadStmt) Span() diag.Span    { return s.At }

// Param is a parameter of a helper: typed by a unit or a quantity, with a
// default where Default is not nil.
type Param struct {
	At      diag.Span
	Name    *Name
	Unit    *UnitRef // nil for `n = 1`: the default's own dimension
	Default Expr
	Note    Note
}

// Helper is a `helper` block: its note is the title and the source.
type Helper struct {
	At     diag.Span
	Name   *Name
	Note   Note
	Params []*Param
	Stmts  []Stmt // *Definition, *Needs, *NoteLine, *Gap, *BadStmt
	Gives  []*Name
	Source *diag.Source
}

// BlockKind is the kind of a fence of ours.
type BlockKind int

// The kinds of fences.
const (
	CalcBlock BlockKind = iota
	HelperBlock
	ScheduleBlock
	CasesBlock
	PlotBlock
	FigureBlock
)

func (k BlockKind) String() string {
	return [...]string{"calc", "helper", "schedule", "cases", "plot", "figure"}[k]
}

// Block is one fence of ours, parsed.
type Block struct {
	At    diag.Span // from the fence's first line to its last
	Kind  BlockKind
	Brief bool // calc brief
	Full  bool // full: no rows are cut in print
	Note  Note // the note of the fence's own line
	Stmts []Stmt
	// One of these is set for the kinds that have no statements.
	Helper *Helper
	Table  *Table
	Plot   *Plot
	Figure *Figure
}

// Table is a schedule or a block of load cases: a header and its rows. Name is
// `cases` for a cases block without a name of its own.
type Table struct {
	At      diag.Span
	Name    *Name
	From    string // the CSV file, "" for rows in the fence
	FromAt  diag.Span
	Columns []Column
	Rows    []Row
}

// Column is one column's head.
type Column struct {
	At     diag.Span
	Name   *Name
	Unit   *UnitRef // nil where none is declared
	Failed bool     // its unit could not be read
}

// Row is one line of a table; it has as many cells as the table has columns.
type Row struct {
	At    diag.Span
	Cells []Cell
}

// Cell is one cell. Expr is nil where the cell is empty or cannot be read as
// an expression; whether a column is text is for the checker to say. Quoted
// tells that the author put the text in quotes, which then are not part of Text.
// Slots counts the names used. Err is an error where Expr is nil, and may be a
// warning beside an Expr. Missing tells that the row ends before the cell, which
// has been reported.
type Cell struct {
	At     diag.Span
	Text   string
	Quoted bool
	Expr   Expr
	Slots  int
	Err    *diag.Diagnostic // why Expr is nil, for a column of numbers

	Missing bool
}

// Plot is a plot block: curves against a swept name, or `plot checks`.
type Plot struct {
	At       diag.Span
	Checks   bool    // bars of utilisation of the file's checks
	Curves   []*Name // Slot from 0 on, in order with Against, bounds and limits
	Against  *Name
	From, To Expr
	Limits   []*Name
	Steps    int // 0 where none is given
	Title    string
	Note     Note
	Slots    int
}

// Figure is a figure block: the kind of sketch and its arguments.
type Figure struct {
	At     diag.Span
	Kind   string
	KindAt diag.Span
	Args   []Arg
	Slots  int
}
