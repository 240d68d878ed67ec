package check

import (
	"fmt"
	"strings"

	"gusset/notebook/diag"
)

// alike warns where two values print as one symbol: the name before a dot stands
// last in the subscript, so `k.tau` prints as `tau_k` does. A line that is only
// the other's name says the same value again.
func (c *checker) alike() {
	dotted := map[string]*Def{} // by the name that prints alike
	each := func(visit func(p *Plan, d *Def)) {
		for _, p := range c.prog.Plans {
			if p.Def == nil || p.Failed {
				continue
			}
			if len(p.Def.Results) == 0 {
				visit(p, p.Def)
			}
			for _, r := range p.Def.Results {
				visit(p, r)
			}
		}
	}
	each(func(_ *Plan, d *Def) {
		if i := strings.LastIndexByte(d.ID, '.'); i >= 0 {
			dotted[d.ID[i+1:]+"_"+d.ID[:i]] = d
		}
	})
	if len(dotted) == 0 {
		return
	}
	each(func(p *Plan, d *Def) {
		other := dotted[d.ID]
		if other == nil || p.is(other) {
			return
		}
		at, first := d, other
		if other.Line > d.Line {
			at, first = other, d
		}
		c.report(diag.Diagnostic{Severity: diag.Warning, ID: diag.Redefined, Source: c.in.Source, Span: at.At,
			Message: fmt.Sprintf("%s prints as %s of line %d does, with another value", at.Symbol, first.Symbol, first.Line),
			Hints:   []string{"give one of them another name, so that no reader takes one for the other"}})
	})
}

// is tells that a line is only the name of another value.
func (p *Plan) is(d *Def) bool {
	b := p.Choice.Branches
	return len(b) == 1 && b[0].Value != nil && b[0].Value.Op == Load && b[0].Value.Def == d
}
