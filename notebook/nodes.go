package notebook

import "github.com/yuin/goldmark/ast"

// KindFence and KindValue are the node kinds that a calc file adds to
// goldmark's tree. A page writer must know both.
var (
	KindFence = ast.NewNodeKind("CalcFence")
	KindValue = ast.NewNodeKind("CalcValue")
)

// FenceNode stands where a fence of ours stood; Index counts into Sheet.Blocks.
type FenceNode struct {
	ast.BaseBlock
	Index int
}

// Kind returns KindFence.
func (n *FenceNode) Kind() ast.NodeKind { return KindFence }

// IsRaw tells goldmark that the node has no inline content.
func (n *FenceNode) IsRaw() bool { return true }

// Dump prints the node for debugging.
func (n *FenceNode) Dump(source []byte, level int) { ast.DumpHelper(n, source, level, nil, nil) }

// ValueNode stands for `{name}` in text; Index counts into Sheet.Refs.
type ValueNode struct {
	ast.BaseInline
	Index int
}

// Kind returns KindValue.
func (n *ValueNode) Kind() ast.NodeKind { return KindValue }

// Dump prints the node for debugging.
func (n *ValueNode) Dump(source []byte, level int) { ast.DumpHelper(n, source, level, nil, nil) }
