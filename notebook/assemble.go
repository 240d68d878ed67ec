package notebook

import (
	"fmt"
	"strconv"
	"strings"

	"github.com/yuin/goldmark/ast"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
)

// assemble fills the sheet with what was computed, and numbers it.
func (s *Sheet) assemble(d *Draft, result *eval.Result) {
	for i, tree := range d.blocks {
		s.Blocks = append(s.Blocks, newBlock(tree, &result.Blocks[i]))
	}
	for _, b := range s.Blocks {
		s.Steps = append(s.Steps, b.Steps...)
	}
	for i, r := range result.Refs {
		s.Refs = append(s.Refs, newRef(r, d.texts[i].Unit != nil))
	}
	ids := anchors{}
	s.number(ids)
	s.nameRemarks(d, ids)
	s.nameHeadings(d, ids)
	s.checkTargets(d, ids)
}

// checkTargets warns of links within the page that lead to nothing.
func (s *Sheet) checkTargets(d *Draft, ids anchors) {
	for n := range nodes(s.Doc) {
		l, ok := n.(*ast.Link)
		if !ok || len(l.Destination) < 2 || l.Destination[0] != '#' {
			continue
		}
		target := unescapePath(string(l.Destination[1:]))
		if ids[target] > 0 {
			continue
		}
		bad := diag.Diagnostic{
			Severity: diag.Warning, ID: diag.DroppedLink, Source: s.Source, Span: d.linkSpan(l, l.Destination),
			Message: fmt.Sprintf("the link leads nowhere: nothing on the page is called `#%s`", clip(target)),
		}
		if near := s.nearTarget(target, ids); near != "" {
			bad.Hints = []string{"did you mean `#" + near + "`?"}
		}
		s.Diagnostics = append(s.Diagnostics, bad)
	}
}

// nearTarget is the anchor that a link to nothing may have meant: a value's, whose
// name was written in another spelling, or a heading's.
func (s *Sheet) nearTarget(target string, ids anchors) string {
	if kind, name, ok := strings.Cut(target, "-"); ok {
		if spelled := kind + "-" + anchorName(syntax.Canonical(name)); ids[spelled] > 0 {
			return spelled
		}
	}
	var known []string
	for _, h := range s.Headings {
		known = append(known, h.Anchor)
	}
	return diag.Nearest(target, known)
}

func newBlock(tree *syntax.Block, r *eval.BlockResult) *Block {
	b := &Block{
		Kind: tree.Kind, Tree: tree, Brief: tree.Brief, Full: tree.Full, Note: tree.Note.Text, Source: tree.Note.Source,
		Steps: r.Steps, Rows: r.Rows, Marks: -1, Plot: r.Plot, Figure: r.Figure,
	}
	switch {
	case tree.Table != nil && tree.Table.Name != nil:
		b.Name = tree.Table.Name.Text
	case tree.Helper != nil && tree.Helper.Name != nil:
		b.Name = tree.Helper.Name.Text
	}
	if tree.Table != nil {
		for i, step := range b.Steps {
			if step.Value.Type.Kind == check.Text {
				b.Marks = i
				break
			}
		}
	}
	return b
}

// number gives equations, checks and figures their numbers in document order,
// and everything that can be referred to its anchor.
func (s *Sheet) number(ids anchors) {
	var parts sections
	var lines equations
	figures := 0
	for n := range nodes(s.Doc) {
		switch n := n.(type) {
		case *ast.Heading:
			if n.Parent() == s.Doc {
				if depth, number := parts.next(n.Level); depth == 1 {
					lines.enter(number)
				}
			}
		case *FenceNode:
			b := s.Blocks[n.Index]
			switch b.Kind {
			case syntax.PlotBlock, syntax.FigureBlock:
				figures++
				b.Number = strconv.Itoa(figures)
				b.Anchor = ids.take("figure-" + b.Number)
			case syntax.ScheduleBlock, syntax.CasesBlock:
				b.Anchor = ids.take("t-" + anchorName(syntax.Canonical(b.Name)))
			}
			for _, step := range b.Steps {
				if b.Kind == syntax.CalcBlock && numbered(step) {
					step.Number = lines.next()
				}
				nameStep(step, ids)
			}
		}
	}
}

// numbered tells whether a step is one that a checker refers to by its number.
func numbered(s *Step) bool {
	switch s.Kind {
	case eval.Computed, eval.Check, eval.Function:
		return true
	}
	return false
}

func nameStep(s *Step, ids anchors) {
	switch {
	case s.Kind == eval.Check:
		s.Anchor = ids.take("c-" + s.Number)
	case s.Kind == eval.Function:
		s.Anchor = ids.take("f-" + anchorName(s.ID))
	case s.ID != "":
		s.Anchor = ids.take("v-" + anchorName(s.ID))
	}
	for _, r := range s.Results {
		r.Anchor = ids.take("v-" + anchorName(r.ID))
	}
}

// anchorName spells a name with what an address may hold.
func anchorName(id string) string { return strings.ReplaceAll(id, "'", "-prime") }

// nameRemarks numbers assumptions and holds.
func (s *Sheet) nameRemarks(d *Draft, ids anchors) {
	s.byRemark = map[ast.Node]*Remark{}
	counts := map[RemarkKind]int{}
	for _, r := range d.remarks {
		counts[r.kind]++
		letter := string(r.kind[:1])
		number := letter + strconv.Itoa(counts[r.kind])
		remark := &Remark{
			Node: r.node, Kind: r.kind, Text: s.PlainText(r.node),
			Anchor: ids.take("r-" + strings.ToLower(number)), Line: s.Source.LineAt(max(r.node.Pos(), 0)),
		}
		if r.kind == Assumption || r.kind == Hold {
			remark.Number = number
		}
		s.Remarks = append(s.Remarks, remark)
		s.byRemark[r.node] = remark
	}
}

// nameHeadings numbers the headings of the calc's own text; those within quotes
// and lists are part of what surrounds them.
func (s *Sheet) nameHeadings(d *Draft, ids anchors) {
	s.byHeading = map[ast.Node]*Heading{}
	var parts sections
	for n := range nodes(s.Doc) {
		h, ok := n.(*ast.Heading)
		if !ok {
			continue
		}
		byName := plain(h, s.Source.Text, func(i int) string { return d.texts[i].Name.ID })
		heading := &Heading{
			Node: h, Text: s.PlainText(h), Anchor: ids.take(slug(byName)), Line: s.Source.LineAt(max(h.Pos(), 0)),
		}
		if h.Parent() == s.Doc {
			heading.Level, heading.Number = parts.next(h.Level)
		} else {
			heading.Level = len(parts.levels) + 1
		}
		s.Headings = append(s.Headings, heading)
		s.byHeading[h] = heading
	}
}

// PlainText is the text of a node and all below it on one line, values
// included as pages print them: what stands for an image that cannot be seen, or for a heading in a list.
func (s *Sheet) PlainText(n ast.Node) string {
	return plain(n, s.Source.Text, func(i int) string {
		if i < len(s.Refs) {
			return s.Refs[i].typeset()
		}
		return ""
	})
}
