package notebook

import (
	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// Together takes sheets that were compiled side by side and drops the notes on
// values that are not used where they are given, but are by another of the
// calcs. Sheets without such a note are returned as they are.
func Together(sheets []*Sheet) []*Sheet {
	used := map[*Step]bool{}
	for _, s := range sheets {
		for _, step := range s.Steps {
			for _, u := range step.Uses {
				if u != nil && u.Origin != nil {
					used[u.Origin.Step] = true
				}
			}
		}
		for _, r := range s.Refs {
			if r.Step != nil && r.Step.Origin != nil {
				used[r.Step.Origin.Step] = true
			}
		}
	}
	out := make([]*Sheet, len(sheets))
	for i, s := range sheets {
		out[i] = s.without(used)
	}
	return out
}

func (s *Sheet) without(used map[*Step]bool) *Sheet {
	places := map[diag.Span]bool{}
	for _, b := range s.Blocks {
		for k, step := range b.Steps {
			if !used[step] {
				continue
			}
			if def, ok := step.Stmt.(*syntax.Definition); ok {
				places[def.Name.At] = true
			} else if t := b.Tree.Table; t != nil && t.From != "" {
				places[t.At] = true
			} else if t != nil && k < len(t.Columns) {
				places[t.Columns[k].At] = true
			}
		}
	}
	if len(places) == 0 {
		return s
	}
	kept := make([]diag.Diagnostic, 0, len(s.Diagnostics))
	for _, d := range s.Diagnostics {
		if d.ID != diag.UnusedValue || d.Source != s.Source || !places[d.Span] {
			kept = append(kept, d)
		}
	}
	if len(kept) == len(s.Diagnostics) {
		return s
	}
	copied := *s
	copied.Diagnostics = kept
	return &copied
}
