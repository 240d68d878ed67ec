package eval

import (
	"math"
	"slices"
	"sync"

	"gusset/notebook/check"
	"gusset/units"
)

// Values over rows go through a small evaluator of columns, since govaluate's
// cost for an entry is right for plain statements and wrong for a sweep. A
// node is compiled once to a list of operations on registers; each operation
// is a tight loop over a block of entries. What does not exist (a division by zero,
// a root of a negative value) is NaN and spreads, so that a condition may pass
// it over; where it reaches a result, that entry is computed once more by
// govaluate, which says why.

const block = 1024 // entries worked on at a time: registers stay in the cache

type columnOp struct {
	node *check.Node
	dst  int
	args []int // registers
	leaf int   // the column a leaf reads, -1 for none
}

type columnProgram struct {
	ops       []columnOp
	registers int
	leaves    []*check.Node
}

func (m *machine) compileColumn(n *check.Node) *columnProgram {
	c := m.memo(n)
	if c.column == nil {
		p := &columnProgram{}
		p.node(n)
		c.column = p
	}
	return c.column
}

func (p *columnProgram) node(n *check.Node) int {
	op := columnOp{node: n, leaf: -1}
	switch {
	case n.Op == check.Const:
	case opaque(n):
		op.leaf = len(p.leaves)
		p.leaves = append(p.leaves, n)
	default:
		for _, a := range n.Args {
			op.args = append(op.args, p.node(a))
		}
	}
	op.dst = p.registers
	p.registers++
	p.ops = append(p.ops, op)
	return op.dst
}

// opaque tells of a node that it is computed as a whole column, not block by block.
func opaque(n *check.Node) bool {
	switch n.Op {
	case check.Load, check.TextLit, check.Reduce, check.At, check.AtRow, check.Interp, check.CallFunc, check.CallHelp, check.CallGo:
		return true
	case check.Compare:
		return n.Args[0].Type.Kind == check.Text
	}
	return false
}

// source is a leaf's column and how its entries lie among the target's:
// entry e of the target reads (e/repeat)%n, or goes through index.
type source struct {
	col       []float64
	repeat, n int
	index     []int32
	whole     bool // the column lies as the target does, entry by entry
}

// column computes all entries of a node over the rows of a target, NaN where
// an entry does not exist. The slice may be the value's own: it is not to be written to.
func (m *machine) column(n *check.Node, f *frame, target *check.Type) []float64 {
	count := target.Count()
	if n.Op == check.Load && !n.Def.IsConst {
		if v, err := f.value(n.Def); err == nil && len(v.Num) == count && slices.Equal(v.Type.Rows, target.Rows) {
			return v.Num
		}
	}
	p := m.compileColumn(n)
	sources := make([]source, len(p.leaves))
	for i, l := range p.leaves {
		sources[i] = m.source(l, f, target)
	}
	out := make([]float64, count)
	last := p.registers - 1
	run := func(lo, hi int) {
		regs, buf := p.scratch()
		for at := lo; at < hi; at += block {
			end := min(at+block, hi)
			regs[last] = out[at:end] // the last operation writes where it belongs
			p.run(regs, sources, at, end)
		}
		scratch.Put(buf)
	}
	if count < 16*block {
		run(0, count)
		return out
	}
	half := count / 2 / block * block
	var wg sync.WaitGroup
	wg.Add(1)
	go func() {
		defer wg.Done()
		run(0, half)
	}()
	run(half, count)
	wg.Wait()
	return out
}

// scratch keeps the registers' memory between columns.
var scratch = sync.Pool{New: func() any { return new([]float64) }}

// scratch returns the program's registers but the last, constants filled in.
func (p *columnProgram) scratch() ([][]float64, *[]float64) {
	buf := scratch.Get().(*[]float64)
	if need := (p.registers - 1) * block; cap(*buf) < need {
		*buf = make([]float64, need)
	}
	regs := make([][]float64, p.registers)
	for i := range regs[:p.registers-1] {
		regs[i] = (*buf)[:cap(*buf)][i*block : (i+1)*block]
		if n := p.ops[i].node; n.Op == check.Const {
			for k := range regs[i] {
				regs[i][k] = n.Num
			}
		}
	}
	return regs, buf
}

func (m *machine) columnValue(n *check.Node, f *frame) Value {
	v := Value{Type: n.Type}
	if n.Type.Kind == check.Text {
		for e := 0; e < n.Type.Count(); e++ {
			x, _ := m.entry(n, f, &n.Type, e)
			s, _ := x.(string)
			v.Text = append(v.Text, s)
		}
		return v
	}
	if len(n.Type.Rows) == 0 {
		x, _ := m.number(n, f, &n.Type, 0)
		v.Num = m.float(x)
		return v
	}
	v.Num = m.column(n, f, &n.Type)
	return v
}

// source makes a leaf's column: a value as it is, all else computed over its
// own rows, entry by entry.
func (m *machine) source(n *check.Node, f *frame, target *check.Type) source {
	if n.Op == check.Load {
		if n.Def.IsConst {
			return source{col: []float64{n.Def.Const}, repeat: 1, n: 1}
		}
		v, err := f.value(n.Def)
		if err != nil {
			return source{col: []float64{nan}, repeat: 1, n: 1}
		}
		return lay(v.Num, &v.Type, target)
	}
	t := n.Type
	t.Rows = keep(t.Rows, target.Rows)
	col := make([]float64, t.Count())
	if n.Op == check.CallFunc && n.Type.Kind != check.Text {
		return lay(m.functionColumn(n, f), &n.Type, target)
	}
	for e := range col {
		x, err := m.entry(n, f, &t, e)
		switch x := x.(type) {
		case float64:
			col[e] = x
		case bool:
			col[e] = truth(x)
		}
		if err != nil {
			col[e] = nan
		}
	}
	return lay(col, &t, target)
}

func keep(rows, among []*check.Rows) []*check.Rows {
	var out []*check.Rows
	for _, r := range rows {
		for _, o := range among {
			if o == r {
				out = append(out, r)
			}
		}
	}
	return out
}

// functionColumn calls an author's function with whole columns at once.
func (m *machine) functionColumn(n *check.Node, f *frame) []float64 {
	count := n.Type.Count()
	fail := func() []float64 {
		col := make([]float64, count)
		for i := range col {
			col[i] = nan
		}
		return col
	}
	g, err := m.functionFrame(n, f)
	if err != nil {
		return fail()
	}
	t := n.Func.Body.Type
	var lost []source // arguments without a value at some entries, where the call has none either
	for i, p := range n.Func.Params {
		v := m.argumentColumn(n.Args[i], f)
		switch col := v.lost(); {
		case col == nil:
		case len(v.Type.Rows) == 0:
			return fail()
		case !entrywise(n.Func): // the body may leave out what is wrong
		case !within(v.Type.Rows, t.Rows):
			return fail() // the body does not use it: the entry says what is wrong with it
		default:
			lost = append(lost, lay(col, &v.Type, &t))
		}
		m.bindParam(g, p, v)
	}
	col, _ := m.branches(n.Func.Body, g, &t)
	if len(lost) == 0 {
		return col
	}
	out, arg := slices.Clone(col), make([]float64, count)
	for _, s := range lost {
		s.read(arg, 0, count)
		for e, x := range arg {
			if !finite(x) {
				out[e] = nan
			}
		}
	}
	return out
}

// noText stands for a text that does not exist, as NaN does for a number. No
// text of a file is this: NUL bytes are refused.
const noText = "\x00"

// argumentColumn is a function's argument over its own rows: NaN or noText where
// an entry does not exist.
func (m *machine) argumentColumn(n *check.Node, f *frame) Value {
	if n.Type.Kind != check.Text {
		return m.columnValue(n, f)
	}
	v := Value{Type: n.Type, Text: make([]string, n.Type.Count())}
	for e := range v.Text {
		x, err := m.entry(n, f, &n.Type, e)
		if v.Text[e], _ = x.(string); err != nil {
			v.Text[e] = noText
		}
	}
	return v
}

// lost is a column with NaN at the entries that do not exist, nil where all do.
func (v *Value) lost() []float64 {
	if i := slices.Index(v.Text, noText); i >= 0 {
		out := make([]float64, len(v.Text))
		for e, x := range v.Text {
			if x == noText {
				out[e] = nan
			}
		}
		return out
	}
	if slices.ContainsFunc(v.Num, func(x float64) bool { return !finite(x) }) {
		return v.Num
	}
	return nil
}

// branches computes a choice over rows: the value of the first branch whose condition
// holds, by mask, and which one that was. NaN marks an entry that failed.
func (m *machine) branches(ch check.Choice, f *frame, t *check.Type) ([]float64, []int) {
	if len(ch.Branches) == 1 && ch.Branches[0].Cond == nil {
		return m.column(ch.Branches[0].Value, f, t), nil
	}
	var out []float64
	var taken []int
	m.quietly(func() { out, taken = m.masked(ch, f, t) }, func() {
		for e := range out {
			m.choice(ch, f, t, e)
		}
	})
	return out, taken
}

// masked computes the branches one by one for all entries.
func (m *machine) masked(ch check.Choice, f *frame, t *check.Type) ([]float64, []int) {
	count := t.Count()
	out, taken := make([]float64, count), make([]int, count)
	for e := range out {
		out[e], taken[e] = nan, -1
	}
	open := count
	for i, b := range ch.Branches {
		if open == 0 {
			break
		}
		var cond []float64
		if b.Cond != nil {
			cond = m.column(b.Cond, f, t)
		}
		value := m.column(b.Value, f, t)
		for e := range out {
			if taken[e] != -1 {
				continue
			}
			switch {
			case cond == nil || cond[e] == 1:
				out[e], taken[e] = value[e], i
				open--
			case cond[e] != 0:
				taken[e] = -2 // the condition itself failed
				open--
			}
		}
	}
	return out, taken
}

// lay says how a column's entries lie among those of a target.
func lay(col []float64, t, target *check.Type) source {
	if len(t.Rows) == 0 || len(col) == 1 {
		return source{col: col, repeat: 1, n: 1}
	}
	// A run of neighbouring sets of the target needs no index.
	for at := range target.Rows {
		if at+len(t.Rows) > len(target.Rows) || !slices.Equal(target.Rows[at:at+len(t.Rows)], t.Rows) {
			continue
		}
		repeat := 1
		for _, r := range target.Rows[at+len(t.Rows):] {
			repeat *= r.N()
		}
		return source{col: col, repeat: repeat, n: len(col), whole: len(col) == target.Count()}
	}
	index := make([]int32, target.Count())
	for e := range index {
		index[e] = int32(max(target.Project(e, *t), 0))
	}
	return source{col: col, index: index}
}

func (s *source) read(dst []float64, lo, hi int) {
	switch {
	case s.index != nil:
		for i, k := range s.index[lo:hi] {
			dst[i] = s.col[k]
		}
	case s.n == 1:
		x := s.col[0]
		for i := range dst[:hi-lo] {
			dst[i] = x
		}
	case s.repeat == 1:
		k := lo % s.n
		for i := 0; i < hi-lo; {
			c := copy(dst[i:hi-lo], s.col[k:])
			i += c
			k = 0
		}
	default:
		k, within := lo/s.repeat%s.n, lo%s.repeat
		for i := range dst[:hi-lo] {
			dst[i] = s.col[k]
			if within++; within == s.repeat {
				within = 0
				if k++; k == s.n {
					k = 0
				}
			}
		}
	}
}

func truth(b bool) float64 {
	if b {
		return 1
	}
	return 0
}

func (p *columnProgram) run(regs [][]float64, sources []source, lo, hi int) {
	n := hi - lo
	for i := range p.ops {
		op := &p.ops[i]
		dst := regs[op.dst][:n]
		if op.leaf >= 0 {
			src := &sources[op.leaf]
			if src.whole && i < len(p.ops)-1 {
				regs[op.dst] = src.col[lo:hi] // as it lies; no operation writes to a leaf
			} else {
				src.read(dst, lo, hi)
			}
			continue
		}
		arg := func(k int) []float64 { return regs[op.args[k]][:n] }
		switch op.node.Op {
		case check.Const:
			if i == len(p.ops)-1 {
				for k := range dst {
					dst[k] = op.node.Num
				}
			}
		case check.Neg:
			x := arg(0)
			for i := range dst {
				dst[i] = -x[i]
			}
		case check.Mul:
			x, y := arg(0), arg(1)
			for i := range dst {
				dst[i] = x[i] * y[i]
			}
		case check.Div:
			x, y := arg(0), arg(1)
			for i := range dst {
				dst[i] = x[i] / y[i]
				if y[i] == 0 || y[i]-y[i] != 0 {
					dst[i] = nan
				}
			}
		case check.Sum:
			p.sum(op, regs, dst)
		case check.Pow:
			raise(dst, arg(0), arg(1), op.node.Args[1])
		case check.ToUnit:
			convert(dst, arg(0), op.node.Unit, units.Unit.FromSI)
		case check.FromUnit:
			convert(dst, arg(0), op.node.Unit, units.Unit.ToSI)
		default:
			p.other(op, regs, dst)
		}
	}
}

func (p *columnProgram) sum(op *columnOp, regs [][]float64, dst []float64) {
	minus := op.node.Minus
	if len(op.args) == 2 {
		x, y, sign := regs[op.args[0]][:len(dst)], regs[op.args[1]][:len(dst)], 1.0
		if minus[1] {
			sign = -1
		}
		for i := range dst {
			b := sign * y[i]
			s := x[i] + b
			if a := math.Abs(s); a < dust*math.Abs(x[i]) || a < dust*math.Abs(b) {
				s = 0
			}
			dst[i] = s
		}
		return
	}
	for i := range dst {
		total, largest := 0.0, 0.0
		for k, r := range op.args {
			x := regs[r][i]
			if minus[k] {
				x = -x
			}
			total += x
			largest = math.Max(largest, math.Abs(x))
		}
		dst[i] = settle(total, largest)
	}
}

func raise(dst, x, y []float64, exponent *check.Node) {
	if exponent.Op == check.Const && exponent.Num == 2 {
		for i := range dst {
			dst[i] = x[i] * x[i]
		}
		return
	}
	for i := range dst {
		dst[i] = power(x[i], y[i])
	}
}

func convert(dst, x []float64, u units.Unit, f func(units.Unit, float64) float64) {
	for i := range dst {
		dst[i] = f(u, x[i])
	}
}

// other computes comparisons, logic and the built-in functions. A truth is 1
// or 0, or NaN where it is not known.
func (p *columnProgram) other(op *columnOp, regs [][]float64, dst []float64) {
	n := op.node
	switch n.Op {
	case check.Not:
		for i := range dst {
			dst[i] = 1 - regs[op.args[0]][i]
		}
	case check.And, check.Or:
		stop := truth(n.Op == check.Or)
		x, y := regs[op.args[0]], regs[op.args[1]]
		for i := range dst {
			dst[i] = x[i]
			if x[i] == 1-stop {
				dst[i] = y[i]
			}
		}
	case check.Compare:
		for i := range dst {
			dst[i] = 1
			for k, o := range n.Cmp {
				a, b := regs[op.args[k]][i], regs[op.args[k+1]][i]
				if !finite(a) || !finite(b) { // of a chain each side has to exist
					dst[i] = nan
					break
				}
				if !compare(o, a, b) {
					dst[i] = 0
				}
			}
		}
	case check.Builtin:
		p.builtin(op, regs, dst)
	}
}

func (p *columnProgram) builtin(op *columnOp, regs [][]float64, dst []float64) {
	x := regs[op.args[0]][:len(dst)]
	if len(op.args) == 1 {
		f := functions1[op.node.Fn]
		for i := range dst {
			if finite(x[i]) {
				dst[i] = f(x[i])
			} else {
				dst[i] = nan
			}
		}
		return
	}
	f := functions2[op.node.Fn]
	copy(dst, x)
	for _, r := range op.args[1:] {
		y := regs[r]
		for i := range dst {
			if finite(dst[i]) && finite(y[i]) {
				dst[i] = f(dst[i], y[i])
			} else {
				dst[i] = nan
			}
		}
	}
}
