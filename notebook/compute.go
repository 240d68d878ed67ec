package notebook

import (
	"fmt"
	"slices"
	"strings"

	"github.com/yuin/goldmark/ast"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/notebook/library"
)

// Compute makes the sheet of a draft. find gives the draft of any file that is
// carried from, directly or not; sheet gives the sheet of a file that the draft carries
// from, and is not asked for one that is part of a cycle. Both drafts and sheets may be
// shared by many computations.
func (d *Draft) Compute(find func(path string) *Draft, sheet func(path string) *Sheet) (s *Sheet) {
	s = &Sheet{Path: d.Path, Source: d.source, Front: d.front, Doc: d.doc, Images: d.images, Files: d.Files, unreadable: d.missing}
	s.Diagnostics = slices.Clone(d.diags)
	if !d.ctx.Panics {
		defer func() {
			if r := recover(); r != nil {
				s = &Sheet{Path: d.Path, Source: d.source, Front: d.front, Doc: ast.NewDocument(), Files: d.Files}
				s.Diagnostics = append(slices.Clone(d.diags), internal(d.source, s.Source.Name, r))
			}
		}()
	}
	if d.dead {
		s.Doc = ast.NewDocument()
		return s
	}
	in := &check.Input{
		Source: d.source, Blocks: d.blocks, Texts: d.texts, Printing: d.front.Printing,
		Helpers: d.helpers, Library: library.Load().Library, ReadTable: d.table,
	}
	carried := map[string]*eval.Carry{}
	for _, l := range d.front.From {
		c, e := s.carry(d, l, find, sheet)
		in.Carried = append(in.Carried, c)
		carried[l.Key] = e
	}
	program := check.Check(in)
	result := eval.Run(program, carried)
	s.Diagnostics = append(s.Diagnostics, result.Diagnostics...)
	s.picked, s.order, s.carriedRows = pickedFrom(program), program.Order, program.CarriedRows
	s.assemble(d, result)
	s.Diagnostics = inSourceOrder(s.Diagnostics, s.Source)
	return s
}

// inSourceOrder sorts diagnostics by place, the calc's own first.
func inSourceOrder(list []diag.Diagnostic, own *diag.Source) []diag.Diagnostic {
	slices.SortStableFunc(list, func(a, b diag.Diagnostic) int {
		switch {
		case (a.Source == own) == (b.Source == own):
			return 0
		case a.Source == own:
			return -1
		}
		return 1
	})
	diag.Sort(list)
	return list
}

// carry takes what a calc file hands on. What keeps it from handing anything on
// is reported where the file is named, once.
func (s *Sheet) carry(d *Draft, l Link, find func(string) *Draft, sheet func(string) *Sheet) (*check.Carry, *eval.Carry) {
	failed := func(severity diag.Severity, id, message string, hints ...string) {
		s.Diagnostics = append(s.Diagnostics, diag.Diagnostic{Severity: severity, ID: id, Message: message, Hints: hints, Source: d.source, Span: l.At})
	}
	c := &check.Carry{Key: l.Key, Path: l.Path, Line: d.source.LineAt(l.At.Start), Failed: true}
	e := &eval.Carry{Key: l.Key}
	name := d.source.Slice(l.At)
	if l.Path == "" {
		return c, e
	}
	if chain := Cycle(d, l.Path, find); chain != nil {
		failed(diag.Error, diag.CarriedCycle, "the calc files carry values from each other in a cycle: "+strings.Join(chain, " → "),
			"move what they share to a file of its own")
		return c, e
	}
	from := sheet(l.Path)
	s.Files = slices.Compact(slices.Sorted(slices.Values(slices.Concat(s.Files, from.Files))))
	if from.Failed() {
		first := from.Diagnostics[slices.IndexFunc(from.Diagnostics, func(d diag.Diagnostic) bool { return d.Severity == diag.Error })]
		if from.unreadable != nil {
			failed(diag.Error, diag.MissingFile, fmt.Sprintf("`%s`: %s", name, first.Message))
			return c, e
		}
		at := ""
		if first.Source != nil {
			at = fmt.Sprintf("%s:%d: ", first.Source.Name, first.Source.LineAt(first.Span.Start))
		}
		failed(diag.Error, diag.CarriedFailed, fmt.Sprintf("`%s` has errors, so nothing is carried from it", name), "the first is "+at+first.Message)
		return c, e
	}
	if ng := from.firstNG(); ng != nil {
		failed(diag.Warning, diag.CarriedFailed, fmt.Sprintf("`%s` has a check that is NG: %s (line %d)", name, from.checkText(ng), ng.Line))
	}
	from.fill(c, e)
	return c, e
}

// fill lists what a sheet hands on: everything that it defines by a name. Sets
// of rows that it carries itself bear its key too, see carriedSets.
func (s *Sheet) fill(c *check.Carry, e *eval.Carry) {
	c.Failed, c.File = false, s.Source.Name
	c.Values, c.Rows = map[string]check.Type{}, map[string]*check.Rows{}
	c.Texts, c.Picked, c.Order = map[string][]string{}, s.picked, s.order
	e.Steps = map[string]*Step{}
	e.Origin = eval.Origin{Key: c.Key, Path: c.Path, Calc: s.Front.Calc, Rev: s.Front.Rev, Title: s.Front.Title}
	for _, b := range s.Blocks {
		if b.Rows != nil {
			c.Rows[b.Rows.Name] = b.Rows
		}
	}
	sets := map[string][]*check.Rows{}
	enter := func(step *Step) {
		c.Values[step.ID] = step.Value.Type
		e.Steps[step.ID] = step
		if step.Value.Type.Kind == check.Text {
			c.Texts[step.ID] = step.Value.Text
		}
		for _, r := range step.Value.Type.Rows {
			if c.Rows[r.Name] != r && !slices.Contains(sets[r.Name], r) {
				sets[r.Name] = append(sets[r.Name], r)
			}
		}
	}
	for _, step := range s.Steps {
		switch step.Kind {
		case eval.Given, eval.Computed, eval.Carried:
			enter(step)
			if len(step.Results) > 0 { // a helper with several results is no value itself
				c.Values[step.ID] = check.Type{Kind: check.Bundle}
			}
			for _, r := range step.Results {
				enter(r)
			}
		}
	}
	s.carriedSets(c, sets)
}

// carriedSets names the sets of rows that a sheet has from other files: as the
// file that made them calls them, and where that stands for two, as the sheet
// calls them itself (`a.plates`).
func (s *Sheet) carriedSets(c *check.Carry, sets map[string][]*check.Rows) {
	c.Shared = map[string][]string{}
	for name, list := range sets {
		own := c.Rows[name] != nil
		if !own && len(list) == 1 {
			c.Rows[name] = list[0]
			continue
		}
		for _, r := range list {
			c.Rows[s.carriedRows[r]] = r
			if !own {
				c.Shared[name] = append(c.Shared[name], s.carriedRows[r])
			}
		}
	}
}

// pickedFrom lists the values that `first of` picked from a schedule's column,
// whose other columns are at hand for them.
func pickedFrom(p *check.Program) map[string]*check.Rows {
	picked := map[string]*check.Rows{}
	for _, plan := range p.Plans {
		if plan.Def != nil && plan.Def.Picked != nil {
			picked[plan.Def.ID] = plan.Def.Picked
		}
	}
	return picked
}

// firstNG is the first check that is not OK, nil where all are.
func (s *Sheet) firstNG() *Step {
	for _, step := range s.Steps {
		if step.Check != nil && !step.Failed && !step.Check.AllOK {
			return step
		}
	}
	return nil
}
