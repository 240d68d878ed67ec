package syntax

import (
	"strings"

	"gusset/notebook/diag"
)

// Print returns an expression as the author wrote it, runs of blanks made one.
// Where it stands on several lines it is put together from its parts, since
// notes, and the marks of a quote or list, stand between them.
func Print(src *diag.Source, e Expr) string {
	text := src.Slice(e.Span())
	if strings.IndexByte(text, '\n') < 0 {
		return collapse(text)
	}
	var b strings.Builder
	write(&b, src, e)
	return b.String()
}

// collapse makes each run of blanks one, those in quoted texts aside.
func collapse(s string) string {
	if !strings.Contains(s, "  ") && strings.IndexByte(s, '\t') < 0 {
		return s
	}
	var b strings.Builder
	inText, blank := false, false
	for i := 0; i < len(s); i++ {
		c := s[i]
		if !inText && byteClass[c]&blankByte != 0 {
			blank = true
			continue
		}
		if blank {
			b.WriteByte(' ')
			blank = false
		}
		if c == '"' {
			inText = !inText
		}
		b.WriteByte(c)
	}
	return b.String()
}

func write(b *strings.Builder, src *diag.Source, e Expr) {
	if text := src.Slice(e.Span()); strings.IndexByte(text, '\n') < 0 {
		b.WriteString(collapse(text))
		return
	}
	switch e := e.(type) {
	case *Unary:
		b.WriteString(e.Op.String())
		if e.Op == Not {
			b.WriteByte(' ')
		}
		write(b, src, e.X)
	case *Binary:
		write(b, src, e.X)
		b.WriteString(between(src, e.X, e.Y, e.Op))
		write(b, src, e.Y)
	case *Compare:
		write(b, src, e.Operands[0])
		for i, op := range e.Ops {
			b.WriteString(" " + op.String() + " ")
			write(b, src, e.Operands[i+1])
		}
	case *Paren:
		b.WriteByte('(')
		write(b, src, e.X)
		b.WriteByte(')')
	case *Call:
		b.WriteString(e.Fun.Text)
		b.WriteByte('(')
		for i, a := range e.Args {
			if i > 0 {
				b.WriteString(", ")
			}
			writeArg(b, src, a)
		}
		b.WriteByte(')')
	case *AtMark:
		write(b, src, e.X)
		b.WriteString(" at ")
		write(b, src, e.Y)
	case *FirstOf:
		b.WriteString("first of ")
		for i, v := range e.Values {
			if i > 0 {
				b.WriteString(", ")
			}
			write(b, src, v)
		}
		b.WriteString(" with ")
		write(b, src, e.Cond)
	}
}

func writeArg(b *strings.Builder, src *diag.Source, a Arg) {
	if a.Name != nil {
		b.WriteString(a.Name.Text + "=")
	}
	write(b, src, a.Value)
	if a.Over != nil {
		b.WriteString(" over " + a.Over.Text)
	}
}

// between returns the operator as it stands on one line between two operands,
// else its spelling with the blanks that read well.
func between(src *diag.Source, x, y Expr, op Op) string {
	text := src.Slice(diag.Span{Start: x.Span().End, End: y.Span().Start})
	if strings.IndexByte(text, '\n') < 0 && strings.TrimSpace(text) != "" {
		return collapse(text)
	}
	switch op {
	case Mul, Div, Pow:
		return op.String()
	}
	return " " + op.String() + " "
}

// Walk calls f for an expression and all expressions below it, in source
// order; it does not go below one for which f is false.
func Walk(e Expr, f func(Expr) bool) {
	if e == nil || !f(e) {
		return
	}
	switch e := e.(type) {
	case *Unary:
		Walk(e.X, f)
	case *Binary:
		Walk(e.X, f)
		Walk(e.Y, f)
	case *Compare:
		for _, x := range e.Operands {
			Walk(x, f)
		}
	case *Paren:
		Walk(e.X, f)
	case *Call:
		Walk(e.Fun, f)
		for _, a := range e.Args {
			Walk(a.Value, f)
			if a.Over != nil {
				Walk(a.Over, f)
			}
		}
	case *AtMark:
		Walk(e.X, f)
		Walk(e.Y, f)
	case *FirstOf:
		for _, v := range e.Values {
			Walk(v, f)
		}
		Walk(e.Cond, f)
	}
}
