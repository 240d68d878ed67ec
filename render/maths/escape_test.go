package maths

import "testing"

// A formula's text is escaped as the prose is: nothing in it opens a tag, is
// no character, or turns the line round.
func TestAppendText(t *testing.T) {
	for _, c := range []struct{ text, want string }{
		{"τ ≤ 3", "τ ≤ 3"},
		{`a<b>&"c"`, "a&lt;b&gt;&amp;&quot;c&quot;"},
		{"a\u202eb\u2066c", "abc"},
		{"a\x00b\x7fc\xffd\ufffee", "a\uFFFDb\uFFFDc\uFFFDd\uFFFDe"},
	} {
		if got := string(AppendText(nil, c.text)); got != c.want {
			t.Errorf("%q: got %q, want %q", c.text, got, c.want)
		}
	}
	if got := string(AppendMathML(nil, Text{Text: "S\u202e355"})); got == "" || containsTurn(got) {
		t.Errorf("a text value keeps its direction mark: %q", got)
	}
}

func containsTurn(s string) bool {
	for _, r := range s {
		if turns(r) {
			return true
		}
	}
	return false
}
