package notebook

import (
	"math"
	"slices"
	"strconv"
	"strings"

	"gusset/notebook/check"
	"gusset/notebook/eval"
	"gusset/units"
)

// maxWords bounds how many different texts of a column a sentence lists.
const maxWords = 5

// newRef prints a value named in text. inUnit tells that the author asked for
// another unit.
func newRef(r eval.RefResult, inUnit bool) *Ref {
	ref := &Ref{Unit: r.Unit}
	if r.Step == nil {
		ref.Text = "not computed"
		ref.Parts = []RefPart{{Words: ref.Text}}
		return ref
	}
	ref.Step = r.Step
	ref.Parts = refParts(r.Step, r.Unit, inUnit)
	ref.Text = ref.text(func(figures string) string { return figures })
	return ref
}

// text joins the parts of a value, each number as set writes its figures.
func (r *Ref) text(set func(figures string) string) string {
	var b strings.Builder
	for _, p := range r.Parts {
		b.WriteString(p.Words)
		if p.Words == "" {
			pieces := slices.Clone(p.Pieces)
			for i := range pieces {
				pieces[i].Figures = set(pieces[i].Figures)
			}
			b.WriteString(eval.PlainText(pieces))
		}
	}
	return b.String()
}

// typeset is the value within a line of a page: the true minus, ×10ⁿ.
func (r *Ref) typeset() string { return r.text(units.Typeset) }

func refParts(s *Step, unit units.Unit, inUnit bool) []RefPart {
	printed := func(entry int) []eval.Piece {
		if inUnit {
			return s.Value.Printed(entry, unit, s.Figures)
		}
		return s.Printed(entry)
	}
	switch {
	case len(s.Results) > 0:
		var parts []RefPart
		for i, r := range s.Results {
			if i > 0 {
				parts = append(parts, RefPart{Words: ", "})
			}
			parts = append(parts, refParts(r, r.Unit, false)...)
		}
		return parts
	case len(s.Value.Type.Rows) == 0:
		return []RefPart{{Pieces: printed(0)}}
	case s.Value.Type.Kind == check.Text:
		return []RefPart{{Words: distinct(s.Value.Text)}}
	}
	least, most := -1, -1
	for i, x := range s.Value.Num {
		if math.IsNaN(x) {
			continue
		}
		if least < 0 || x < s.Value.Num[least] {
			least = i
		}
		if most < 0 || x > s.Value.Num[most] {
			most = i
		}
	}
	if least < 0 {
		return []RefPart{{Pieces: nil}}
	}
	from, to := printed(least), printed(most)
	if eval.PlainText(from) == eval.PlainText(to) {
		return []RefPart{{Pieces: from}}
	}
	parts := []RefPart{{Pieces: from}, {Words: " to "}, {Pieces: to}, {Words: " (" + s.Value.Type.Mark(s.Entry) + " governs)"}}
	// The entry that decides a check downstream need not be the largest; then the
	// range alone would seem to say that it is.
	far := least
	if math.Abs(s.Value.Num[most]) > math.Abs(s.Value.Num[least]) {
		far = most
	}
	own := printed(s.Entry)
	if math.Abs(s.Value.Num[s.Entry]) < math.Abs(s.Value.Num[far]) && eval.PlainText(own) != eval.PlainText(printed(far)) {
		parts[3].Words = strings.TrimSuffix(parts[3].Words, ")") + " with "
		parts = append(parts, RefPart{Pieces: own}, RefPart{Words: ")"})
	}
	return parts
}

// distinct lists the different texts of a column in order.
func distinct(texts []string) string {
	var list []string
	for _, t := range texts {
		if t != "" && !slices.Contains(list, t) {
			if len(list) == maxWords {
				return strings.Join(list, ", ") + " and others of " + strconv.Itoa(len(texts)) + " rows"
			}
			list = append(list, t)
		}
	}
	return strings.Join(list, ", ")
}
