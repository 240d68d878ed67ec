package render

import (
	"slices"
	"strconv"
	"strings"

	"gusset/notebook"
	"gusset/notebook/eval"
	"gusset/render/maths"
)

// NewPage decides what a compiled calc prints. The sheet has no errors.
func NewPage(s *notebook.Sheet) *Page {
	c := &composer{maths: maths.NewBuilder(), sheet: s, picks: newPicks(s), verdicts: map[*eval.CheckResult]*Verdict{}}
	p := &Page{Sheet: s, Title: title(&s.Front)}
	p.Blocks = make([][]Entry, len(s.Blocks))
	c.numberCautions()
	for i, b := range s.Blocks {
		p.Blocks[i] = c.block(b)
	}
	p.Values = make([]Text, len(s.Refs))
	for i, r := range s.Refs {
		p.Values[i] = c.value(r)
	}
	p.Lists = c.lists()
	p.drawChecks()
	p.State = state(s, p.Lists.Checks)
	return p
}

// composer makes a page.
type composer struct {
	maths    *maths.Builder
	sheet    *notebook.Sheet
	cautions []CautionLine
	calls    int // helpers placed so far
	picks    picks
	verdicts map[*eval.CheckResult]*Verdict
}

func title(f *notebook.Front) Title {
	t := Title{Title: f.Title, Firm: f.Firm, Logo: f.Logo, Paper: f.Paper}
	if t.Title == "" {
		t.Title = f.Calc
	}
	var under []string
	if f.Project != "" {
		under = append(under, f.Project)
	}
	if f.Job != "" {
		under = append(under, "job "+f.Job)
	}
	if f.Client != "" {
		under = append(under, "for "+f.Client)
	}
	t.Under = strings.Join(under, " · ")
	t.Cells = [8]Cell{
		{"Calc", f.Calc, ""}, {"Revision", f.Rev, ""}, {"Purpose", f.Status, ""}, {"Date", f.Date, ""},
		{"Prepared", f.By.Name, f.By.Date}, {"Checked", f.Checked.Name, f.Checked.Date},
		{"Approved", f.Approved.Name, f.Approved.Date}, {"Sheet", "", ""},
	}
	for i := range t.Cells[:7] {
		if t.Cells[i].Text == "" {
			t.Cells[i].Text = "–"
		}
	}
	return t
}

// value is a value named in prose, which leads to where it was computed.
func (c *composer) value(r *notebook.Ref) Text {
	if r.Step == nil {
		return Text{{Words: r.Text}}
	}
	ref := maths.Ref{Target: r.Step.Anchor}
	if len(r.Step.Value.Type.Rows) == 0 {
		ref.Tip = c.maths.Tip(r.Step, r.Step.Entry)
	}
	text := make(Text, 0, 2*len(r.Parts))
	for _, p := range r.Parts {
		if p.Words != "" {
			text = append(text, TextPart{Words: p.Words})
		}
		if len(p.Pieces) > 0 {
			text = append(text, TextPart{Value: c.maths.Pieces(p.Pieces, ref)})
		}
	}
	return text
}

// state counts what the box under the title block says. The checks come in the
// order of the summary.
func state(s *notebook.Sheet, checks []Summary) State {
	st := State{Checks: len(checks)}
	for i := range checks {
		switch v := checks[i].Verdict; {
		case !v.Required:
			st.NotRequired++
		case !v.OK:
			st.NG++
		}
	}
	for i := range checks {
		if v := checks[i].Verdict; v.Utilisation != "" && (st.NG == 0 || !v.OK) {
			st.Worst = &checks[i]
			break
		}
	}
	for _, r := range s.Remarks {
		switch r.Kind {
		case notebook.Hold:
			st.Holds++
		case notebook.Assumption:
			st.Assumptions++
		}
	}
	return st
}

// eachCall visits the helpers called in steps, those they call included.
func eachCall(steps []*eval.Step, visit func(*eval.Step, *eval.Call)) {
	for _, s := range steps {
		for _, call := range s.Calls {
			if call.Helper != nil { // nil for a function of the author's own
				visit(s, call)
			}
			eachCall(call.Steps, visit)
		}
	}
}

// numberCautions collects what the helpers caution against, each once.
func (c *composer) numberCautions() {
	eachCall(c.sheet.Steps, func(_ *eval.Step, call *eval.Call) {
		for _, text := range call.Cautions {
			line := c.caution(text)
			if line == nil {
				n := strconv.Itoa(len(c.cautions) + 1)
				c.cautions = append(c.cautions, CautionLine{Number: "C" + n, Anchor: "caution-" + n, Text: text})
				line = &c.cautions[len(c.cautions)-1]
			}
			name := call.Helper.Name.Text
			if !slices.Contains(line.Helpers, name) {
				line.Helpers = append(line.Helpers, name)
			}
		}
	})
}

func (c *composer) caution(text string) *CautionLine {
	for i := range c.cautions {
		if c.cautions[i].Text == text {
			return &c.cautions[i]
		}
	}
	return nil
}
