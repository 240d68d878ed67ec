//go:build tex

package pdf

import (
	"flag"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"
)

var besideTeX = flag.String("tex", "", "a folder to write formulas to, as this package and as TeX set them, for a comparison by eye")

// texPairs are formulas in the notation and in TeX.
var texPairs = []struct{ calc, tex string }{
	{"x_1 = P/(2*A)", `x_1 = \frac{P}{2\,A}`},
	{"x_2 = pi*d^2/4", `x_2 = \frac{\pi\, d^2}{4}`},
	{"x_3 = sqrt(a^2 + 3*b^2)", `x_3 = \sqrt{a^2 + 3\, b^2}`},
	{"x_4 = (a + b)^2/(1 + 1/c)", `x_4 = \frac{(a + b)^2}{1 + \frac{1}{c}}`},
	{"x_5 = (a/b + 1)*(c - 1/(a + b))", `x_5 = \left(\frac{a}{b} + 1\right) \left(c - \frac{1}{a + b}\right)`},
	{"x_6 = sqrt((a - b)^2/4 + c^2)", `x_6 = \sqrt{\frac{(a - b)^2}{4} + c^2}`},
	{"x_7 = a*b^3/12 + 2*c*(b/2)^2", `x_7 = \frac{a\, b^3}{12} + 2\, c \left(\frac{b}{2}\right)^2`},
	{"x_8 = max(a, b)/min(b, c)", `x_8 = \frac{\max(a, b)}{\min(b, c)}`},
	{"x_9 = -a - b*(-c)", `x_9 = -a - b \cdot (-c)`},
}

// The comparison with TeX is by eye and run by hand:
//
//	go test -tags tex ./render/pdf -run TestBesideTeX -tex /tmp/tex
//
// What was kept different is written down in the package comment of render/maths.
func TestBesideTeX(t *testing.T) {
	if *besideTeX == "" {
		t.Fatal("name a folder: -tex /tmp/tex")
	}
	var calc, tex strings.Builder
	calc.WriteString("---\ncalc: T\n---\n```calc\nP = 3\nA = 2\nd = 2\na = 2\nb = 3\nc = 4\n")
	tex.WriteString("\\documentclass[11pt]{article}\\usepackage[a4paper,margin=3cm]{geometry}\\begin{document}\\pagestyle{empty}\n")
	for _, p := range texPairs {
		calc.WriteString(p.calc + "\n")
		tex.WriteString("\\[ " + p.tex + " \\]\n")
	}
	calc.WriteString("```\n")
	tex.WriteString("\\end{document}\n")
	file, err := Write(pageOf(t, calc.String(), nil), time.Time{})
	if err != nil {
		t.Fatal(err)
	}
	for name, data := range map[string][]byte{"ours.pdf": file, "tex.tex": []byte(tex.String())} {
		if err := os.WriteFile(filepath.Join(*besideTeX, name), data, 0o666); err != nil {
			t.Fatal(err)
		}
	}
	for _, c := range [][]string{
		{"pdflatex", "-interaction=batchmode", "tex.tex"},
		{"pdftoppm", "-r", "150", "-png", "tex.pdf", "tex"},
		{"pdftoppm", "-r", "150", "-f", "1", "-l", "1", "-png", "ours.pdf", "ours"},
	} {
		cmd := exec.Command(c[0], c[1:]...)
		cmd.Dir = *besideTeX
		if out, err := cmd.CombinedOutput(); err != nil {
			t.Fatalf("%v: %v\n%s", c, err, out)
		}
	}
}
