package diag

import "testing"

// Lines and columns count from 1, columns in code points; a byte-order mark
// and carriage returns are not part of a line.
func TestPosition(t *testing.T) {
	s := NewSource("a.md", []byte("\xef\xbb\xbfτ = 3\r\nσ_b = ×\n"))
	for _, c := range []struct{ offset, line, column int }{{0, 1, 1}, {2, 1, 2}, {8, 2, 1}, {10, 2, 2}, {999, 3, 1}, {-1, 1, 1}} {
		if line, column := s.Position(c.offset); line != c.line || column != c.column {
			t.Errorf("offset %d: %d:%d, want %d:%d", c.offset, line, column, c.line, c.column)
		}
	}
	if got := s.Line(1); got != "τ = 3" {
		t.Errorf("line 1 is %q", got)
	}
	if got := s.Line(9); got != "" {
		t.Errorf("line 9 is %q", got)
	}
}

func TestText(t *testing.T) {
	src := NewSource("lug.md", []byte("a = 1\nτ [MPa] = P/d   # a wide 梁 and a\ttab\n"))
	d := Diagnostic{ID: DimensionMismatch, Message: "wrong", Hints: []string{"do this"}, Source: src, Span: Span{17, 20}}
	want := "lug.md:2:11: wrong\n    2 | τ [MPa] = P/d   # a wide 梁 and a tab\n      |           ^^^\n   do this\n"
	if got := d.Text(); got != want {
		t.Errorf("got\n%swant\n%s", got, want)
	}
	if j := d.JSON(); j.Line != 2 || j.Column != 11 || j.EndColumn != 14 || j.Severity != "error" || j.ID != "dimension-mismatch" {
		t.Errorf("%+v", j)
	}
	// What a file from outside holds, or is called, cannot steer the terminal.
	hostile := NewSource("x\n.md", []byte("a = \x1b[2J\u202e1\n"))
	if got := (Diagnostic{Severity: Warning, Message: "m", Source: hostile, Span: Span{0, 1}}).Text(); got != "x\uFFFD.md:1:1: warning: m\n    1 | a = \uFFFD[2J\uFFFD1\n      | ^\n" {
		t.Errorf("%q", got)
	}
}

func TestNearest(t *testing.T) {
	names := []string{"tau_d", "sigma_b", "P", "MPa"}
	for _, c := range []struct{ word, want string }{
		{"tau_b", "tau_d"}, {"sigmab", "sigma_b"}, {"igsma_b", "sigma_b"}, {"p", "P"}, {"Q", ""}, {"Mpa", "MPa"}, {"length", ""}, {"", ""},
	} {
		if got := Nearest(c.word, names); got != c.want {
			t.Errorf("%s: %q, want %q", c.word, got, c.want)
		}
	}
}

func TestSort(t *testing.T) {
	a, b := NewSource("a", nil), NewSource("b", nil)
	list := []Diagnostic{{Source: b, Span: Span{5, 6}}, {Source: a, Span: Span{9, 9}}, {Source: b, Span: Span{1, 2}, Severity: Note}, {Source: a}}
	Sort(list)
	if list[0].Span.Start != 1 || list[1].Span.Start != 5 || list[2].Span.Start != 0 || list[3].Span.Start != 9 || !HasErrors(list) || HasErrors(list[:1]) {
		t.Errorf("%+v", list)
	}
}
