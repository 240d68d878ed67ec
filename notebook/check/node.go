package check

import (
	"math/big"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
	"gusset/units"
)

// Op is what a node of the checked tree does.
type Op uint8

// The operations of the checked tree.
const (
	Const   Op = iota // Num
	TextLit           // Str
	Load              // the value of Def
	Neg
	Sum // the terms in Args, each negated where its Minus is set
	Mul
	Div
	Pow
	Compare // Args joined by Cmp
	And
	Or
	Not
	Builtin  // the function Fn of the arguments
	Reduce   // Fn of the entries of Args[0] over the sets of rows in Over
	At       // Args[0] at the mark Args[1], looked for in Over[0]
	AtRow    // Args[0] at the row that Def's `first of` picked
	Interp   // linear interpolation: columns Args[0], Args[1] at Args[2]
	CallFunc // an author's function: Func with the arguments
	CallHelp // a helper: Help with the arguments, the result Result
	CallGo   // a function in Go: Native
	ToUnit   // the plain number of Args[0] in Unit
	FromUnit // the quantity of that many Unit
)

// Node is an expression whose dimensions and rows have been checked. It holds
// no units but those of a `where`; literals are in coherent SI.
type Node struct {
	Op    Op
	zero  bool // the bare literal 0, which fits any dimension
	plain bool // stems from literals alone
	bare  bool // a bare literal number, for the warning on angles
	Type  Type
	Expr  syntax.Expr // what it was made from
	Args  []*Node
	Num   float64
	Def   *Def
	*Detail

	// Memo is the evaluator's: what it compiled the node to.
	Memo any

	exact *big.Rat // the exact value of arithmetic on bare literals
}

// Detail is what the rarer operations have. A node of another operation has an
// empty one, so that it may be asked.
type Detail struct {
	Str    string
	Fn     string
	Minus  []bool
	Cmp    []syntax.Op
	Over   []*Rows
	Unit   units.Unit
	Func   *Function
	Help   *HelperCall
	Result int
	Native *Native
}

var noDetail Detail

// Def is something that has a name and a value.
type Def struct {
	ID      string
	Symbol  string
	Slot    int
	Scope   *Scope
	Type    Type
	Unit    *units.Unit // the unit it is printed in, nil where the file's preference decides
	Line    int
	At      diag.Span
	Because int
	Plan    *Plan // nil for constants, parameters and carried values
	Carry   *Carry
	Key     string // its name in the carried file
	Const   float64
	Failed  bool // by an error at line Because
	IsConst bool
	used    bool
	zero    bool // a parameter that was given the literal 0
	plain   bool
	Literal *syntax.Number // a given's own figures
	Texts   []string       // a given text, or a column of texts
	Picked  *Rows          // the schedule whose column a `first of` picked it from
	Results []*Def         // of a helper with several
	exact   *big.Rat
}

// Scope numbers the values of the calc itself, of a function's parameters or
// of a helper's body. Parent is where a function looks for what it does not
// define itself; a helper's body has none.
type Scope struct {
	Parent *Scope
	Size   int
}

func (s *Scope) newSlot() int {
	s.Size++
	return s.Size - 1
}

// Choice is a value by condition, in order; a plain value is one branch
// without a condition.
type Choice struct {
	Type     Type
	Branches []Branch
	FirstOf  *FirstOf
}

// Branch is one branch of a choice: Cond is nil for a plain value and for `otherwise`.
type Branch struct {
	Value *Node
	Cond  *Node
}

// FirstOf picks the first candidate for which Cond holds with Def standing
// for it. Column is nil where the candidates are listed in Values; its rows are Rows.
type FirstOf struct {
	Def    *Def // what stands for the candidate inside Cond
	Values []*Node
	Column *Node
	Rows   *Rows
	Cond   *Node
	Expr   *syntax.FirstOf
}

// Function is an author's function as used with arguments of certain types.
type Function struct {
	Def    *syntax.Definition
	Scope  *Scope
	Params []*Def
	Body   Choice
	Where  []syntax.WhereItem
	Unit   *syntax.UnitRef
	Uses   []*Def // by slot of the definition's names
	cost   int
}

// HelperCall is a helper as used by one call.
type HelperCall struct {
	Expr    *syntax.Call
	Helper  *syntax.Helper
	Library bool
	Scope   *Scope
	Params  []*Def
	Columns []bool  // which parameters take a column
	Args    []*Node // one for each parameter: the caller's, or the default (then Given is false)
	Given   []bool
	Plans   []*Plan
	Results []*Def
	Loop    []*Rows // the rows the call runs over, once for each entry
}

// Plan is a statement ready to be computed.
type Plan struct {
	Stmt    syntax.Stmt
	Line    int
	Block   int
	Def     *Def // nil for checks and limits
	Choice  Choice
	Check   *CheckPlan
	Because int
	Uses    []*Def      // by slot of the statement's names; nil for functions and helpers
	Helper  *HelperCall // set where the right side is only a call of a helper with several results
	Column  *ColumnPlan
	Func    bool // the definition of a function: nothing to compute
	Failed  bool
	IsGiven bool
	Carried bool // the right side is only another file's value
}

// CheckPlan is a comparison chain, or a limit of a helper.
type CheckPlan struct {
	Cond    *Node
	Sides   []*Node // the operands where Cond is one comparison chain
	Ops     []syntax.Op
	If      *Node
	IfSides []*Node
	IfOps   []syntax.Op
	Type    Type // the rows it runs over
	Warn    bool // a limit that only warns
}

// ColumnPlan is one column of a schedule: an expression for each row, nil
// where the cell is a text.
type ColumnPlan struct {
	Cells  []*Node
	Texts  []string
	Trees  []*syntax.Cell
	Rows   *Rows
	Uses   [][]*Def
	Failed []int // rows whose cell failed
}

// Program is a checked file.
type Program struct {
	In          *Input
	Scope       *Scope
	Plans       []*Plan          // in order of the statements; schedules give one for each column
	BlockRows   []*Rows          // by block, nil where it has none
	Order       []*Rows          // all sets of rows that it has met, as their axes stand in values
	CarriedRows map[*Rows]string // the names of those that come from other files
	Refs        []RefPlan
	Plots       map[int]*PlotPlan // by block
	Figures     map[int]*FigurePlan
	Diagnostics []diag.Diagnostic
	Loads       []*Def // constants and carried values, set before anything is computed
}

// RefPlan is a value named in prose.
type RefPlan struct {
	Def  *Def // nil where it failed
	Unit *units.Unit
}
