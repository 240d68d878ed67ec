package html_test

import (
	"bytes"
	"image"
	"image/png"
	"regexp"
	"strings"
	"testing"
	"testing/fstest"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/html"
)

// constructs are all that CommonMark and tables have, and what stands on the
// page for each: any text that is lost, or element that is wrong, shows.
var constructs = []struct {
	name, markdown string
	want           []string
}{
	{"paragraphs", "one one\ntwo\n\nthree", []string{"<p>one one\ntwo</p>", "<p>three</p>"}},
	{"names with hyphens", "see S-77, EN 1993-1-8; well-known, -5 and 3 - 4", []string{`see <span class="nb">S-77,</span> EN <span class="nb">1993-1-8;</span> well-known, -5 and 3 - 4`}},
	{"names behind units", "of 12 mm-2 and 5 mm S-7", []string{"of 12 <span class=\"nb\">mm-2</span> and 5\u00a0mm <span class=\"nb\">S-7</span>"}},
	{"numbers and units", "over 12 mm or 5 kN/m, 20 bolts, in 2 lines", []string{"over 12\u00a0mm or 5\u00a0kN/m, 20 bolts, in 2 lines"}},
	{"hard break", "one  \ntwo\\\nthree", []string{"one<br>\ntwo<br>\nthree"}},
	{"atx headings", "# Top\n\n## Under\n\n### Third\n\n#### Fourth\n\n##### Fifth\n\n###### Sixth",
		[]string{`<h2 id="top"><span class="no">1</span> Top</h2>`, `<h3 id="under"><span class="no">1.1</span> Under</h3>`, "Third</h4>", "Fourth</h5>", "Fifth</h6>", "Sixth</h6>"}},
	{"setext headings", "Top\n===\n\nUnder\n-----", []string{"Top</h2>", "Under</h3>"}},
	{"outermost level", "### Only\n\n#### Under", []string{`<span class="no">1</span> Only</h2>`, "Under</h3>"}},
	{"thematic break", "a\n\n***\n\nb", []string{"<hr>"}},
	{"indented code", "    if a < b {\n        c & d", []string{"<code>if a &lt; b {\n    c &amp; d", "</code></pre>"}},
	{"fenced code", "```go\nx := \"1\" // {P} *no*\n```", []string{"<code>x := &quot;1&quot; // {P} *no*\n</code>"}},
	{"tilde fence", "~~~\na\n~~~", []string{"<code>a\n</code>"}},
	{"raw HTML block", "<div onclick=\"x()\">\n<b>bold</b>\n</div>", []string{"&lt;div onclick=&quot;x()&quot;&gt;", "&lt;b&gt;bold&lt;/b&gt;", "&lt;/div&gt;"}},
	{"script", "<script>alert(1)</script>", []string{"&lt;script&gt;alert(1)&lt;/script&gt;"}},
	{"comment", "<!-- hidden -->", []string{"&lt;!-- hidden --&gt;"}},
	{"raw HTML in line", "a <b>c</b> d", []string{"a &lt;b&gt;c&lt;/b&gt; d"}},
	{"quote", "> said *so*\n>\n> twice", []string{"<blockquote><p>said <em>so</em></p><p>twice</p></blockquote>"}},
	{"nested quote", "> a\n> > b", []string{"<blockquote><p>a</p><blockquote><p>b</p></blockquote></blockquote>"}},
	{"tight list", "- a\n- b\n  - c", []string{"<ul class=\"tight\">\n<li>a</li>", "<li>b\n<ul class=\"tight\">\n<li>c</li>"}},
	{"loose list", "- a\n\n- b", []string{"<li><p>a</p></li>", "<li><p>b</p></li>"}},
	{"ordered list", "3. a\n4. b", []string{`<ol start="3" class="tight">`, "<li>a</li>"}},
	{"list with blocks", "1. a\n\n   ```\n   b\n   ```\n\n   > c", []string{"<li><p>a</p><pre tabindex=\"0\"><code>b\n</code></pre><blockquote><p>c</p></blockquote></li>"}},
	{"emphasis", "*a* _b_ **c** __d__ ***e***", []string{"<em>a</em> <em>b</em> <strong>c</strong> <strong>d</strong> <em><strong>e</strong></em>"}},
	{"code span", "`a < b` and ``c ` d``", []string{"<code>a &lt; b</code> and <code>c ` d</code>"}},
	{"code span over lines", "`a\nb`", []string{"<code>a b</code>"}},
	{"link", "[text *b*](https://example.com/a?b=c&d \"a title\")", []string{`<a href="https://example.com/a?b=c&amp;d" title="a title" rel="noopener noreferrer">text <em>b</em></a>`}},
	{"reference link", "[text][ref]\n\n[ref]: <notes.md> 'more'", []string{`<a href="notes.md" title="more"`, ">text</a>"}},
	{"link within", "# Top\n\n[there](#top)", []string{`<a href="#top"`}},
	{"autolinks", "<https://example.com/x> <me@example.com>", []string{`<a href="https://example.com/x"`, ">https://example.com/x</a>", `<a href="mailto:me@example.com"`}},
	{"unsafe links", "[a](javascript:alert(1)) [b](data:text/html,x) [c](vbscript:x) <javascript:x> [d](JaVaScRiPt:x)", []string{"a b c javascript:x d"}},
	{"image", "![a *b* c](img.png \"The caption\")", []string{`<figure><img width="3" height="2" alt="a b c" src="data:image/png;base64,…"><figcaption>a b c – The caption</figcaption></figure>`}},
	{"image without words", "![](img.png)", []string{`src="data:image/png;base64,…"></figure>`}},
	{"image in a line", "see ![a](img.png \"b\") there", []string{`<p>see <img width="3" height="2" alt="a" title="b" src="data:image/png;base64,…"> there</p>`}},
	{"image elsewhere", "![far](https://example.com/a.png)", []string{"<p>far</p>"}},
	{"escapes", `\*a\* \{P} &amp; &lt; &copy; &#65; &#x42;`, []string{"*a* {P} &amp; &lt; © A B"}},
	{"control characters", "a\u0001b \u202ec\u202c d", []string{"a\uFFFDb c d"}},
	{"table", "a | b | c\n:-- | --: | :-:\n*1* | `2` | {P}\nx \\| y | |", []string{"<th>a</th><th class=\"r\">b</th><th class=\"c\">c</th>",
		"<td><em>1</em></td><td class=\"r\"><code>2</code></td><td class=\"c\">", "48\u00a0kN", "<td>x | y</td>"}},
	{"value", "The pull is {P}, or {P [lbf]}.", []string{`<a class="v" href="#v-P" data-tip="P = 48 kN`, "48\u00a0kN</a>", "10791\u00a0lbf"}},
	{"value in heading", "# Pull of {P}", []string{"Pull of <span"}},
	{"text in text", "Plate {S}.\n\n```calc\nS = \"S355, 20 mm\"\n```", []string{`Plate <a class="v" href="#v-S" data-tip="S = S355, 20 mm">S355, 20 mm</a>.`}},
	{"braces", "{not a name} { } {a+b}", []string{"{not a name} { } {a+b}"}},
	{"assumption", "> Assumption: It is *so*.", []string{`<div class="remark assumption" role="note" id="r-a1"><b class="lead">Assumption A1</b><div><p>It is <em>so</em>.</p></div></div>`}},
	{"hold, caution, note", "> Hold: h\n\n> Caution: c\n\n> Note: n", []string{"Hold H1</b><div><p>h</p>", "Caution</b><div><p>c</p>", "Note</b><div><p>n</p>"}},
	{"calc in a list", "- before\n\n  ```calc\n  Q = 2*P # Twice\n  ```", []string{`<div class="nested"><div class="row e formula" id="v-Q">`, "Twice"}},
	{"calc in a quote", "> before\n>\n> ```calc\n> Q = 2*P # Twice\n> ```", []string{`<div class="nested">`, "Twice"}},
	{"greek", "τ and Ω, 5 ≤ 6", []string{"τ and Ω, 5 ≤ 6"}},
}

// fragment is the body of a page of some Markdown.
func fragment(t testing.TB, markdown string) string {
	t.Helper()
	var img bytes.Buffer
	if err := png.Encode(&img, image.NewGray(image.Rect(0, 0, 3, 2))); err != nil {
		t.Fatal(err)
	}
	text := "---\ncalc: T-1\n---\n\n```calc\nP = 48 kN\n```\n\n" + markdown + "\n"
	s := notebook.Compile(&notebook.Context{FS: fstest.MapFS{"t.md": {Data: []byte(text)}, "img.png": {Data: img.Bytes()}}, Panics: true}, "t.md")
	if s.Failed() {
		for _, d := range s.Diagnostics {
			t.Error(d.Text())
		}
	}
	page := body(html.Append(nil, render.NewPage(s)))
	_, page, _ = strings.Cut(page, "<main>")
	page, _, _ = strings.Cut(page, "</main>")
	return page
}

func TestConstructs(t *testing.T) {
	for _, c := range constructs {
		page := fragment(t, c.markdown)
		for _, want := range c.want {
			if !strings.Contains(page, want) {
				t.Errorf("%s: no %q in\n%s", c.name, want, page)
			}
		}
	}
}

var (
	scripts  = regexp.MustCompile(`(?i)<script|<iframe|<object|<[a-z][^>]*\son[a-z]+=`)
	links    = regexp.MustCompile(`(?:href|src)="([^"]*)"`)
	harmless = regexp.MustCompile(`^(#|https?:|mailto:|tel:|data:image/(png|jpeg|gif);base64,)|^[^:]*$|^[^:/?#]*[/?#]`)
)

// dangers is what a page must not hold whatever the file says.
func dangers(page string) []string {
	found := scripts.FindAllString(page, -1)
	for _, m := range links.FindAllStringSubmatch(page, -1) {
		if !harmless.MatchString(m[1]) {
			found = append(found, m[0])
		}
	}
	return found
}

func TestNoDanger(t *testing.T) {
	for _, c := range constructs {
		if found := dangers(fragment(t, c.markdown)); found != nil {
			t.Errorf("%s: %q", c.name, found)
		}
	}
}
