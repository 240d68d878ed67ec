package render

import (
	"gusset/notebook"
	"gusset/render/figure"
	"gusset/render/maths"
)

// drawing is a plot or a figure. Bars of utilisation are drawn by drawChecks
// once the summary of the checks stands.
func drawing(b *notebook.Block) *Drawing {
	d := &Drawing{Number: b.Number, Caption: b.Note}
	switch {
	case b.Figure != nil:
		d.Art = figure.Sketch(b.Figure)
	case b.Plot != nil && !b.Plot.Checks:
		d.Art = figure.Plot(b.Plot)
	}
	return d
}

// drawChecks draws the plots of the calc's checks, in the order of the summary.
func (p *Page) drawChecks() {
	for i, b := range p.Sheet.Blocks {
		if b.Plot == nil || !b.Plot.Checks {
			continue
		}
		bars := make([]figure.Bar, len(p.Lists.Checks))
		for n, c := range p.Lists.Checks {
			bars[n] = figure.Bar{
				Number: c.Number, Note: c.Note, Formula: chainRow(c.Formula), Mark: c.Mark, Ratio: c.Verdict.Ratio,
				Utilisation: c.Verdict.Utilisation, Word: c.Verdict.Word, OK: c.Verdict.OK,
			}
		}
		for _, e := range p.Blocks[i] {
			if e.Drawing != nil {
				e.Drawing.Art = figure.Bars(b.Plot.Title, bars)
			}
		}
	}
}

// chainRow is a formula with its relations in one row.
func chainRow(c maths.Chain) maths.Node {
	row := maths.Row{c.Left}
	for _, s := range c.Steps {
		row = append(row, maths.Relation(s.Sign), s.Right)
	}
	return row
}
