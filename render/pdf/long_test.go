package pdf

import (
	"strings"
	"testing"
)

// A text of any length stands within the sheet, wherever it is written.
func TestLongTexts(t *testing.T) {
	words := strings.Repeat("many words ", 900)
	word := strings.Repeat("endless", 1400)
	head := func(keys string) string { return strings.Replace(front, "rev: B\n", keys, 1) }
	calc := func(lines string) string { return front + "\n```calc\n" + lines + "\n```\n" }
	for _, long := range []struct{ name, text string }{{"words", words}, {"a word", word}} {
		places := map[string]string{
			"title":            strings.Replace(front, "A lug", long.text, 1),
			"number":           strings.Replace(front, "C-1", strings.TrimSpace(long.text[:94]), 1),
			"revision":         head("rev: " + long.text[:94] + "\n"),
			"project":          head("project: " + long.text + "\n"),
			"firm":             head("firm: " + long.text + "\n"),
			"prepared":         head("by: " + long.text + "\n"),
			"purpose":          head("status: " + long.text + "\n"),
			"heading":          front + "\n# " + long.text + "\n",
			"paragraph":        front + "\n" + long.text + "\n",
			"emphasis":         front + "\n**" + strings.TrimSpace(long.text) + "**\n",
			"code span":        front + "\n`" + long.text + "`\n",
			"code":             front + "\n    " + long.text + "\n",
			"item":             front + "\n- " + long.text + "\n",
			"quote":            front + "\n> " + long.text + "\n",
			"remark":           front + "\n> Assumption: " + long.text + "\n",
			"table head":       front + "\n| a | " + long.text + " |\n|---|---|\n| b | c |\n",
			"table cell":       front + "\n| a | b |\n|---|---|\n| b | " + long.text + " |\n",
			"image":            front + "\n![" + long.text + "](dot.png)\n",
			"note of a given":  calc("P = 3 kN # " + long.text),
			"note":             calc("# " + long.text),
			"source":           calc("P = 3 kN # pull [" + long.text + "]"),
			"note of a value":  calc("P = 3 kN\nF = 2*P # " + long.text),
			"note of a check":  calc("P = 3 kN\ncheck P < 4 kN # " + long.text + " [" + long.text + "]"),
			"text":             calc("grade = \"" + long.text + "\""),
			"a text's use":     calc("grade = \""+long.text+"\"\nother = grade\ncheck grade == other") + "\n{grade}\n",
			"mark":             front + "\n```cases # " + long.text + "\ncase | V [kN]\n" + long.text + " | 3\nLC2 | 2\n```\n\n```calc\nF = 2*V\ncheck F < 4 kN\n```\n",
			"caption of a set": front + "\n```schedule s # " + long.text + "\nmark | x [mm]\na | 1\n```\n",
		}
		if long.name == "a word" {
			places["name"] = calc(strings.Repeat("n", 190) + " = 3 kN\nF = 2*" + strings.Repeat("n", 190))
		}
		for name, text := range places {
			t.Run(name+" of "+long.name, func(t *testing.T) {
				p := pageOf(t, text, map[string]string{"dot.png": dotPNG(t)})
				l := newDocument(p).layout()
				inFrame(t, l)
				if _, err := l.write(fixedDate); err != nil {
					t.Fatal(err)
				}
			})
		}
	}
}
