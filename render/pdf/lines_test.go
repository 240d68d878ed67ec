package pdf

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gusset/render/fonts"
)

func words(s string) *paragraph {
	p := &paragraph{}
	p.write(proseVoice.style(), s)
	return p
}

// linesOf returns the texts of the lines a paragraph is broken into.
func linesOf(p *paragraph, width float64) []string {
	p = p.fitted(width)
	var out []string
	for _, l := range p.lines(width) {
		var k ink
		p.set(&k, l, 0, 0)
		line := ""
		for i, t := range k.texts {
			if i > 0 {
				line += " "
			}
			line += t.text
		}
		out = append(out, line)
	}
	return out
}

func TestLines(t *testing.T) {
	tests := []struct {
		name, text string
		width      float64
		want       []string
	}{
		{"one line", "short text", 300, []string{"short text"}},
		{"blanks collapse", "  a   b \n c ", 300, []string{"a b c"}},
		{
			"the line above gives a word to the one below", // a greedy breaker leaves a hole in the second line
			"aaaa aaaa a aaaaaaaaaaaaa aa aa aa aa", 80,
			[]string{"aaaa aaaa a", "aaaaaaaaaaaaa", "aa aa aa aa"},
		},
		{"behind a hyphen", "shear-critical", 45, []string{"shear-", "critical"}},
		{"not behind a sign", "at -5 to -7 and -9", 46, []string{"at -5 to", "-7 and -9"}},
		{"a word without a place to break is cut", "mmmmmmmmmm", 40, []string{"mmm", "mmm", "mmm", "m"}},
		{"a zero-width space breaks", "mmm\u200Bmmm", 40, []string{"mmm", "mmm"}},
		{"a no-break space does not", "aa bb\u00A0cc", 34, []string{"aa", "bb\u00A0cc"}},
		{"nothing", "", 40, nil},
	}
	for _, tt := range tests {
		got := linesOf(words(tt.text), tt.width)
		if strings.Join(got, "|") != strings.Join(tt.want, "|") {
			t.Errorf("%s: got %q, want %q", tt.name, got, tt.want)
		}
	}
}

// A number and the letter of a revision cost a line that begins with them.
func TestNumbersStayWithTheirWords(t *testing.T) {
	for _, tt := range []struct {
		text string
		want bool
	}{{"Table 3.10", true}, {"Table J3.2", true}, {"rev B, sheet", true}, {"prev B", false}, {"revision of", false}, {"Table of", false}} {
		if got := words(tt.text).words[0].cost == numberCost; got != tt.want {
			t.Errorf("%s: bound %v, want %v", tt.text, got, tt.want)
		}
	}
}

// bruteForce is the least cost over all ways to break a paragraph.
func bruteForce(p *paragraph, from int, width float64) float64 {
	if from == len(p.words) {
		return 0
	}
	best := math.Inf(1)
	set := 0.0
	for to := from + 1; to <= len(p.words); to++ {
		set += p.words[to-1].width
		if set > width+0.001 && to > from+1 {
			break
		}
		last := to == len(p.words)
		cost := lineCost(set, width, to-from, last) + bruteForce(p, to, width)
		if !last {
			cost += p.words[to-1].cost
		}
		best = math.Min(best, cost)
		set += p.words[to-1].space
	}
	return best
}

// The total fit is the best of all ways to break, no line is wider than the
// column, and every word stands on one line.
func TestLinesAreTheBest(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		list := rapid.SliceOfN(rapid.StringMatching(`[a-z]{1,9}(-[a-z]{2,6})?`), 1, 11).Draw(t, "words")
		width := rapid.Float64Range(70, 160).Draw(t, "width")
		p := words(strings.Join(list, " ")).fitted(width)
		got, at := 0.0, 0
		lines := p.lines(width)
		for i, l := range lines {
			if l.from != at || l.to <= l.from {
				t.Fatalf("line %d holds words %d to %d, want it to start at %d", i, l.from, l.to, at)
			}
			at = l.to
			if l.width > width+0.01 {
				t.Fatalf("line %d is %.2f wide in a column of %.2f", i, l.width, width)
			}
			got += lineCost(l.width, width, l.to-l.from, i == len(lines)-1)
			if i < len(lines)-1 {
				got += p.words[l.to-1].cost
			}
		}
		if at != len(p.words) {
			t.Fatalf("%d of %d words are set", at, len(p.words))
		}
		// A paragraph that fits on a line is left there.
		if want := bruteForce(p, 0, width); len(lines) > 1 && got > want+1e-9 {
			t.Fatalf("lines cost %.4f, the best %.4f", got, want)
		}
	})
}

// A line is one text for each stretch of one style.
func TestLineIsOneRun(t *testing.T) {
	p := &paragraph{}
	st := proseVoice.style()
	p.write(st, "plain words and ")
	p.write(st.in(fonts.SerifSemiBold), "heavy words")
	p.write(st, " and plain again")
	var k ink
	p.set(&k, p.lines(500)[0], 0, 0)
	if len(k.texts) != 3 {
		t.Errorf("got %d texts, want 3: %v", len(k.texts), k.texts)
	}
	if got, want := k.texts[1].x, st.width("plain words and "); math.Abs(got-want) > 0.01 {
		t.Errorf("the second text starts at %.2f, want %.2f", got, want)
	}
}
