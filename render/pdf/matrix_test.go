package pdf

import (
	"strings"
	"testing"

	"gusset/render/maths"
)

// printed is all that a layout prints below the title block, piece by piece,
// page by page.
func printed(l *layout) string {
	var b strings.Builder
	put := func(k *ink) {
		for _, t := range k.texts {
			if t.items == nil {
				b.WriteString(t.text + " ")
			}
			for _, i := range t.items {
				if i.Kind == maths.Run {
					b.WriteString(i.Text + " ")
				}
			}
		}
	}
	for _, page := range l.pages {
		for i := range page {
			put(&page[i].ink)
		}
	}
	return b.String()
}

// constructs are the constructs of CommonMark and of calc files with the words
// that must be on the page, in order.
var constructs = []struct{ name, markdown, words string }{
	{"paragraph", "alpha beta\ngamma", "alpha beta gamma"},
	{"two paragraphs", "alpha\n\nbeta", "alpha beta"},
	{"heading", "# alpha", "1 alpha"},
	{"heading with closing marks", "## alpha ##", "1 alpha"},
	{"setext headings", "alpha\n=====\n\nbeta\n----", "1 alpha 1.1 beta"},
	{"deep heading", "# a\n\n## b\n\n### c\n\n#### d\n\n##### e\n\n###### f", "1 a 1.1 b 1.1.1 c d e f"},
	{"heading with inline content", "# *alpha* `beta` [gamma](https://example.com)", "1 alpha beta gamma"},
	{"emphasis", "*alpha* _beta_ **gamma** __delta__ ***epsilon***", "alpha beta gamma delta epsilon"},
	{"emphasis within a word", "al*ph*a", "al ph a"},
	{"code span", "`alpha *beta*` and `` ` ``", "alpha *beta* and `"},
	{"code span over lines", "`alpha\nbeta`", "alpha beta"},
	{"Greek in a code span", "`tau=τ`", "tau= τ"},
	{"inline link", "[alpha](https://example.com \"title\")", "alpha"},
	{"link with parts", "[alpha *beta* `gamma`](https://example.com)", "alpha beta gamma"},
	{"reference link", "[alpha][r] [r]\n\n[r]: https://example.com", "alpha r"},
	{"undefined reference", "[alpha][nothing]", "[alpha][nothing]"},
	{"link within the calc", "[alpha](#beta)\n\n# beta", "alpha 1 beta"},
	{"link to a file", "[alpha](other.md)", "alpha"},
	{"autolink", "<https://example.com/alpha>", "https://example.com/alpha"},
	{"mail", "<alpha@example.com>", "alpha@example.com"},
	{"dropped link", "[alpha](javascript:beta)", "alpha"},
	{"hard breaks", "alpha\\\nbeta  \ngamma", "alpha beta gamma"},
	{"escapes", "\\*alpha\\* \\{beta\\}", "*alpha* {beta}"},
	{"entities", "&amp; &lt; &copy; &#945; &#x3b2; &nothing; &", "& < © α β &nothing; &"},
	{"thematic break", "alpha\n\n---\n\nbeta", "alpha beta"},
	{"quote", "> alpha\n> beta\n\ngamma", "alpha beta gamma"},
	{"lazy quote", "> alpha\nbeta", "alpha beta"},
	{"nested quotes", "> alpha\n>\n> > beta\n> >\n> > > gamma", "alpha beta gamma"},
	{"quote with everything", "> # alpha\n>\n> - beta\n>\n> `gamma`\n>\n>     delta\n>\n> | a | b |\n> |---|---|\n> | c | d |", "alpha • beta gamma delta a b c d"},
	{"bullets", "- alpha\n- beta\n* gamma\n+ delta", "• alpha • beta • gamma • delta"},
	{"loose bullets", "- alpha\n\n- beta", "• alpha • beta"},
	{"numbers", "1. alpha\n2. beta", "1. alpha 2. beta"},
	{"numbers from seven, bracketed", "7) alpha\n8) beta", "7) alpha 8) beta"},
	{"nested lists", "- alpha\n  1. beta\n     - gamma\n- delta", "• alpha 1. beta • gamma • delta"},
	{"list in a list at once", "- - alpha", "• • alpha"},
	{"item with blocks", "- alpha\n\n  beta\n\n      gamma\n\n  > delta\n\n  ```\n  epsilon\n  ```", "• alpha beta gamma delta epsilon"},
	{"empty items", "- \n- alpha\n-", "• • alpha •"},
	{"item that is a heading", "- # alpha", "• alpha"},
	{"item that is a table", "- | a | b |\n  |---|---|\n  | c | d |", "• a b c d"},
	{"indented code", "    alpha  beta\n\n    gamma", "alpha  beta gamma"},
	{"fenced code", "```go\nalpha := \"beta\"\n\n\tgamma\n```", "alpha := \"beta\" gamma"},
	{"tilde fence", "~~~\nalpha\n~~~", "alpha"},
	{"HTML block", "<div class=\"a\">\nalpha\n</div>", "<div class=\"a\"> alpha </div>"},
	{"HTML in a line", "alpha <b>beta</b> <!-- gamma -->", "alpha <b>beta</b> <!-- gamma -->"},
	{"table", "| alpha | beta |\n|:--|--:|\n| gamma | delta |\n| `a\\|b` | **epsilon** |", "alpha beta gamma delta a|b epsilon"},
	{"table with a ragged row", "| a | b |\n|---|---|\n| c |\n", "a b c"},
	{"table without rows", "| alpha | beta |\n|---|---|", "alpha beta"},
	{"image that is a paragraph", "![alpha](dot.png \"beta\")", "alpha – beta"},
	{"image in a line", "see ![alpha](dot.png) gamma", "see gamma"},
	{"linked image", "[![alpha](dot.png)](https://example.com)", ""},
	{"remarks", "> Assumption: alpha\n\n> Hold: beta\n\n> Caution: gamma\n\n> Note: delta", "Assumption A1 alpha Hold H1 beta Caution gamma Note delta Assumptions A1 alpha Holds H1 beta"},
	{"remark with blocks", "> Assumption: alpha\n>\n> - beta\n>\n> gamma", "Assumption A1 alpha • beta gamma"},
	{"a value in each place", "# at {P}\n\nin {P [N]}\n\n- of {P}\n\n| a |\n|---|\n| {P} |\n\n> q {P}\n\n[l {P}](https://example.com) *e {P}*\n\n```calc\nP = 48 kN # pull [s]\n```",
		"1 at 48 kN in 48000 N • of 48 kN a 48 kN q 48 kN l 48 kN e 48 kN"},
	{"braces that are text", "a {not a name} b {", "a {not a name} b {"},
	{"an unbroken word", strings.Repeat("alphabeta", 40), ""},
	{"an emoji", "alpha 😀 beta", "alpha U+1F600 beta"},
}

// No construct loses text on paper.
func TestConstructs(t *testing.T) {
	for _, tt := range constructs {
		t.Run(tt.name, func(t *testing.T) {
			p := pageOf(t, front+"\n"+tt.markdown+"\n", map[string]string{"dot.png": dotPNG(t)})
			l := newDocument(p).layout()
			inFrame(t, l)
			got := strings.Join(strings.Fields(printed(l)), "")
			at := 0
			for _, w := range strings.Fields(tt.words) {
				i := strings.Index(got[at:], w)
				if i < 0 {
					t.Fatalf("`%s` is not on the page, or not in its place: %s", w, printed(l))
				}
				at += i + len(w)
			}
			if _, err := l.write(fixedDate); err != nil {
				t.Fatal(err)
			}
		})
	}
}

// A word of any length is on the page as a whole.
func TestLongWord(t *testing.T) {
	word := strings.Repeat("alphabeta", 400)
	p := pageOf(t, front+"\n"+word+"\n\n| a | "+word+" |\n|---|---|\n| "+word+" | b |\n", nil)
	l := newDocument(p).layout()
	inFrame(t, l)
	all := strings.ReplaceAll(printed(l), " ", "")
	if n := strings.Count(all, "alphabeta"); n < 2*400 {
		t.Errorf("%d of %d parts are on the page", n, 3*400)
	}
}
