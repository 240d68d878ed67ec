package render

import (
	"bytes"
	"cmp"
	"slices"
	"sort"
	"strings"
	"unicode/utf8"

	"gusset/notebook"
	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
	"gusset/render/maths"
)

// standingNotes stand at the end of every calc.
var standingNotes = []string{
	"Values are carried in full precision; figures are rounded for print.",
	"The results depend on the stated inputs and assumptions.",
	"The governing code and a licensed engineer decide.",
}

// lists makes the closing lists.
func (c *composer) lists() Lists {
	l := Lists{
		Checks:    c.summary(),
		Unsourced: c.unsourced(),
		Symbols:   c.symbols(),
		Sources:   c.sources(),
		Cautions:  c.cautions,
		Notes:     standingNotes,
	}
	for _, r := range c.sheet.Remarks {
		switch r.Kind {
		case notebook.Assumption:
			l.Assumptions = append(l.Assumptions, r)
		case notebook.Hold:
			l.Holds = append(l.Holds, r)
		}
	}
	return l
}

// summary lists the checks: NG first, then by utilisation, those without one,
// and those not required.
func (c *composer) summary() []Summary {
	var list []Summary
	for _, s := range c.sheet.Steps {
		if s.Check == nil || s.Kind != eval.Check || s.Failed {
			continue
		}
		line := Summary{
			Number: s.Number, Anchor: s.Anchor, Note: s.Note,
			Formula: c.asWritten(s, s.Check),
			Mark:    s.Check.Type.Mark(s.Check.Governs), Verdict: c.verdict(s.Check),
		}
		if !line.Verdict.Required {
			line.Reason, line.Mark = c.needed(s), ""
		}
		list = append(list, line)
	}
	return inOrder(list, func(i, j int) int {
		a, b := &list[i], &list[j]
		if d := cmp.Compare(a.Verdict.standing(), b.Verdict.standing()); d != 0 {
			return d
		}
		if a.Verdict.Utilisation == "" || b.Verdict.Utilisation == "" {
			return 0
		}
		return -cmp.Compare(a.Verdict.Ratio, b.Verdict.Ratio)
	})
}

// standing is the place of a verdict's group in the summary.
func (v *Verdict) standing() int {
	group := 0
	switch {
	case !v.Required:
		return 4
	case v.OK:
		group = 2
	}
	if v.Utilisation == "" {
		group++
	}
	return group
}

// unsourced lists the givens that do not say where they come from.
func (c *composer) unsourced() []Unsourced {
	var list []Unsourced
	for _, b := range c.sheet.Blocks {
		switch b.Kind {
		case syntax.ScheduleBlock, syntax.CasesBlock:
			if b.Source == "" {
				list = append(list, Unsourced{Symbol: maths.Text{Text: b.Name}, Anchor: b.Anchor, Note: b.Note})
			}
		case syntax.CalcBlock:
			for _, s := range b.Steps {
				if s.Kind == eval.Given && s.Source == "" {
					list = append(list, Unsourced{c.maths.Plain(s), s.Anchor, c.maths.Output(s, s.Entry), s.Note})
				}
			}
		}
	}
	return list
}

// defined are all steps that define a symbol, in order, the columns of
// schedules included.
func (c *composer) defined() []*eval.Step {
	list := make([]*eval.Step, 0, len(c.sheet.Steps))
	for _, b := range c.sheet.Blocks {
		for i, s := range b.Steps {
			if s.ID == "" || s.Failed || b.Rows != nil && i == b.Marks {
				continue
			}
			if s.Value.Type.Kind != check.Bundle && len(s.Results) == 0 {
				list = append(list, s)
			}
			list = append(list, s.Results...)
		}
	}
	return list
}

// symbols explains every symbol, Latin letters before Greek ones.
func (c *composer) symbols() []SymbolLine {
	steps := c.defined()
	meaning := c.meanings()
	list := make([]SymbolLine, len(steps))
	ends := make([]int, len(steps))
	var keys []byte
	for i, s := range steps {
		line := SymbolLine{Symbol: c.maths.Plain(s), Meaning: meaning(s), Anchor: s.Anchor, Where: c.where(s)}
		if k := s.Value.Type.Kind; k == check.Number || k == check.Point {
			line.Unit = c.maths.Unit(s.Unit)
		}
		list[i] = line
		keys = appendSymbolKey(keys, line.Symbol.(maths.Symbol))
		ends[i] = len(keys)
	}
	key := func(i int) []byte {
		if i == 0 {
			return keys[:ends[0]]
		}
		return keys[ends[i-1]:ends[i]]
	}
	return inOrder(list, func(a, b int) int { return bytes.Compare(key(a), key(b)) })
}

// appendSymbolKey appends what symbols are ordered by: their letters, small and
// large ones of a letter together, then their subscripts and primes. A zero byte
// ends each, so that the shorter of two comes first.
func appendSymbolKey(dst []byte, s maths.Symbol) []byte {
	dst = append(append(dst, strings.ToLower(s.Head)...), 0)
	dst = append(append(dst, s.Head...), 0)
	for _, p := range s.Sub {
		dst = append(append(dst, p...), 0)
	}
	return utf8.AppendRune(append(dst, 0), rune(s.Primes))
}

// inOrder sorts lines, equal ones as they stand; compare is given their places.
func inOrder[T any](list []T, compare func(a, b int) int) []T {
	order := make([]int, len(list))
	for i := range order {
		order[i] = i
	}
	slices.SortFunc(order, func(a, b int) int {
		if d := compare(a, b); d != 0 {
			return d
		}
		return a - b
	})
	sorted := make([]T, len(list))
	for i, k := range order {
		sorted[i] = list[k]
	}
	return sorted
}

// meanings tells what a symbol stands for: its note, for a column the name of
// its schedule, for a result of a helper the note of the call.
func (c *composer) meanings() func(*eval.Step) string {
	other := map[*eval.Step]string{}
	for _, b := range c.sheet.Blocks {
		for _, s := range b.Steps {
			if b.Rows != nil {
				other[s] = "column of " + b.Name
			}
			for _, r := range s.Results {
				other[r] = s.Note
			}
		}
	}
	return func(s *eval.Step) string {
		if s.Note == "" {
			return other[s]
		}
		return s.Note
	}
}

// where is the number of a step, else of the section it stands in.
func (c *composer) where(s *eval.Step) string {
	if s.Number != "" {
		return "(" + s.Number + ")"
	}
	before := sort.Search(len(c.sheet.Headings), func(i int) bool { return c.sheet.Headings[i].Line > s.Line })
	for before--; before >= 0; before-- {
		if n := c.sheet.Headings[before].Number; n != "" {
			return "section " + n
		}
	}
	return ""
}

// sources lists what is cited, in order, with what rests on it.
func (c *composer) sources() []SourceLine {
	var list []SourceLine
	at := map[string]int{}
	rest := func(source string, on Resting) {
		i, ok := at[source]
		if !ok {
			i = len(list)
			at[source] = i
			list = append(list, SourceLine{Source: source})
		}
		n := len(list[i].On)
		if n > 0 && list[i].On[n-1].Anchor == on.Anchor && list[i].On[n-1].Number == on.Number {
			return // cited twice in one place
		}
		list[i].On = append(list[i].On, on)
	}
	var cited []string
	for _, b := range c.sheet.Blocks {
		if b.Kind != syntax.CalcBlock {
			name := b.Name
			if b.Kind == syntax.PlotBlock || b.Kind == syntax.FigureBlock {
				name = "figure " + b.Number
			}
			if b.Source != "" {
				rest(b.Source, Resting{Symbol: maths.Text{Text: name}, Anchor: blockAnchor(b)})
			}
			continue
		}
		for _, s := range b.Steps {
			if s.Number == "" && s.ID == "" {
				continue
			}
			if cited = citedBy(cited[:0], s); len(cited) == 0 {
				continue
			}
			on := Resting{Anchor: s.Anchor}
			if s.Number != "" {
				on.Number = "(" + s.Number + ")"
			} else {
				on.Symbol = c.maths.Plain(s)
			}
			for _, source := range cited {
				rest(source, on)
			}
		}
	}
	return list
}

// citedBy appends the sources that a step rests on: its own, the calcs that its
// values were carried from, and those of the helpers it calls.
func citedBy(dst []string, s *eval.Step) []string {
	add := func(source string) {
		if source != "" {
			dst = append(dst, source)
		}
	}
	add(s.Source)
	if s.Origin != nil {
		add(maths.Origin(s.Origin))
	}
	for _, u := range s.Uses {
		if u != nil && maths.IsCarried(u) {
			add(maths.Origin(u.Origin))
		}
	}
	if len(s.Calls) > 0 {
		eachCall([]*eval.Step{s}, func(_ *eval.Step, call *eval.Call) { add(call.Helper.Note.Source) })
	}
	return dst
}
