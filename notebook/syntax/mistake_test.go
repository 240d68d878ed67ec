package syntax

import (
	"regexp"
	"strings"
	"testing"

	"gusset/notebook/diag"
)

// mistakes are statements with one mistake each: the id of the one diagnostic,
// the text that is underlined, and the statement corrected. Where hints show
// corrections, one of them makes the corrected statement.
var mistakes = []struct{ source, id, under, corrected string }{
	// figures
	{"x = 1,200 mm", "syntax", "1,200", "x = 1200 mm"},
	{"x = 1,200,000.5 N", "syntax", "1,200,000.5", "x = 1200000.5 N"},
	{"x = max(1,200, b)", "syntax", "1,200", "x = max(1200, b)"},
	{"x = max(1200,300)", "syntax", "1200,300", "x = max(1200, 300)"},
	{"x = 1 200 mm", "syntax", "1 200", "x = 1200 mm"},
	{"x = 1 200 000 mm", "syntax", "1 200 000", "x = 1_200_000 mm"},
	{"x = 1'200 mm", "syntax", "1'200", "x = 1200 mm"},
	{"x = 1,5 mm", "syntax", "1,5", "x = 1.5 mm"},
	{"x = 12. kN", "syntax", "12.", "x = 12 kN"},
	{"x = 1.2.3", "syntax", "1.2.3", "x = 1.23"},
	{"x = 1e400", "not-a-number", "1e400", "x = 1e300"},
	{"x = 1e-400", "not-a-number", "1e-400", "x = 1e-300"},
	{"x = 1e400 kN", "not-a-number", "1e400", "x = 1e300 kN"},
	{"x = 1e−3 m", "syntax", "1e−3", "x = 1e-3 m"},
	{"x = 2 x 3", "syntax", "2 x 3", "x = 2 * 3"},
	{"x = 2 kN + 4 x b_1", "syntax", "4 x b_1", "x = 2 kN + 4 * b_1"},
	{"x = 0x1F", "syntax", "0x1F", "x = 31"},
	{"A = 3 sq.ft", "wrong-unit-spelling", "3 sq.ft", "A = 3 ft^2"},
	{"A = 3 sq in", "wrong-unit-spelling", "3 sq in", "A = 3 in^2"},
	{"V = 2 cu. yd", "wrong-unit-spelling", "2 cu. yd", "V = 2 yd^3"},
	{"x = d mod 3", "syntax", "d mod 3", "x = d - 3*floor(d/3)"},
	{"x = 3 4", "syntax", "3 4", "x = 3 * 4"},
	{`x = "a \"b\""`, "syntax", `"a \"b`, `x = "a b"`},
	{"x = 1 3/8", "syntax", "1 3/8", "x = (1 + 3/8)"},
	{"x = a/1 3/8 in", "syntax", "1 3/8 in", "x = a/(1 3/8 in)"},
	{"x = 3/0 in", "not-a-number", "3/0", "x = 3/4 in"},
	{"x = 1 3/0 in", "not-a-number", "1 3/0", "x = 1 3/4 in"},
	{"x = ½ in", "syntax", "½", "x = 1/2 in"},
	// feet and inches, compounds
	{"L = 12 ft-6 in", "syntax", "12 ft-6 in", "L = 12 ft 6 in"},
	{"L = 12 ft -6 1/2 in", "syntax", "12 ft -6 1/2 in", "L = 12 ft 6 1/2 in"},
	{"L = 12'-6\"  # Span", "syntax", "12'-6\"", "L = 12 ft 6 in  # Span"},
	{"L = 12'-6 1/2\"", "syntax", "12'-6 1/2\"", "L = 12 ft 6 1/2 in"},
	{"L = 12' 6\"", "syntax", "12' 6\"", "L = 12 ft 6 in"},
	{"L = 12′ 6″", "syntax", "12′ 6″", "L = 12 ft 6 in"},
	{"L = 12’", "syntax", "12’", "L = 12 ft"},
	{"L = 6\"", "syntax", "6\"", "L = 6 in"},
	{"L = 6''", "syntax", "6''", "L = 6 in"},
	{"L = 3/4\"", "syntax", "3/4\"", "L = 3/4 in"},
	{"L = 1 3/4\" + a", "syntax", "1 3/4\"", "L = 1 3/4 in + a"},
	{"L = 12 ft 6", "syntax", "12 ft 6", "L = 12 ft 6 in"},
	{"L = 5 m 3 kN", "syntax", "5 m 3 kN", "L = 5 m * 3 kN"},
	{"L = 6 in 12 ft", "syntax", "6 in 12 ft", "L = 6 in + 12 ft"},
	{"L = 12.5 ft 6 in", "syntax", "12.5 ft 6 in", "L = 12.5 ft + 6 in"},
	{"T = 5 degC 3 degC", "syntax", "5 degC 3 degC", "T = 5 degC * 3 degC"},
	{"x = 6-1/2 in", "syntax", "6-1/2 in", "x = 6 1/2 in"},
	{"x = (12 ft 6-1/2 in)", "syntax", "6-1/2 in", "x = (12 ft 6 1/2 in)"},
	{"a = 30° 15'", "syntax", "15'", "a = 30° 15 arcmin"},
	{"a = 30 deg 15'20\"", "syntax", "15'20\"", "a = 30 deg 15 arcmin 20 arcsec"},
	// units
	{"x = 3 (kN/m)", "syntax", "3 (kN/m)", "x = 3 kN/m"},
	{"x = max(a; b)", "syntax", ";", "x = max(a, b)"},
	{"x = a > b ? 2 : 3", "syntax", "?", "x = 2 if a > b\n= 3 otherwise"},
	{"x = 5 kN.m", "wrong-unit-spelling", "kN.m", "x = 5 kN*m"},
	{"x = 5 N.mm/m + 3", "wrong-unit-spelling", "N.mm", "x = 5 N*mm/m + 3"},
	{"x = 5 kN.q", "syntax", ".", "x = 5 kN * q"},
	{"x = 5 kN m", "wrong-unit-spelling", "5 kN m", "x = 5 kN*m"},
	{"x = 20 deg C", "wrong-unit-spelling", "20 deg C", "x = 20 degC"},
	{"x = 20 ° C", "wrong-unit-spelling", "20 ° C", "x = 20 °C"},
	{"x (mm) = 3 mm", "syntax", "(mm)", "x [mm] = 3 mm"},
	{"x = 48 kips", "wrong-unit-spelling", "kips", "x = 48 kip"},
	{"x = 48 kips/ft", "wrong-unit-spelling", "kips", "x = 48 kip/ft"},
	{"x = 48 lb", "wrong-unit-spelling", "lb", "x = 48 lbf"},
	{"x = 48 lbs", "wrong-unit-spelling", "lbs", "x = 48 lbf"},
	{"x = 3 ton", "wrong-unit-spelling", "ton", "x = 3 tonf"},
	{"x = 3 ft-lb", "wrong-unit-spelling", "ft-lb", "x = 3 ft-lbf"},
	{"x = 48 Kn", "wrong-unit-spelling", "Kn", "x = 48 kN"},
	{"x = 48mpa", "wrong-unit-spelling", "mpa", "x = 48MPa"},
	{"x = 2 kNm", "wrong-unit-spelling", "kNm", "x = 2 kN*m"},
	{"x = 2 mm2", "wrong-unit-spelling", "mm2", "x = 2 mm^2"},
	{"x = 20 C", "wrong-unit-spelling", "20 C", "x = 20 degC"},
	{"x = 48 kN/w", "wrong-unit-spelling", "48 kN/w", "x = 48 kN / w"},
	{"x = 48 kN*w", "wrong-unit-spelling", "48 kN*w", "x = 48 kN * w"},
	{"x = 48kN/bolts.n + a", "wrong-unit-spelling", "48kN/bolts.n", "x = 48kN / bolts.n + a"},
	{"x = 48 kN/m/w_1", "wrong-unit-spelling", "48 kN/m/w_1", "x = 48 kN/m / w_1"},
	{"x = 48 kN/mtr", "wrong-unit-spelling", "kN/mtr", "x = 48 kN/m"},
	{"x = 48 kNx", "unknown-unit", "48 kNx", "x = 48 kN"},
	{"x = 2 x_1", "unknown-unit", "2 x_1", "x = 2*x_1"},
	{"x = 2 q", "unknown-unit", "2 q", "x = 2*q"},
	{"x = 2 τ", "unknown-unit", "2 τ", "x = 2*τ"},
	{"x = 2 bolts.n", "unknown-unit", "2 bolts.n", "x = 2*bolts.n"},
	{"x = 2 sqrt(3)", "unknown-unit", "2 sqrt(3)", "x = 2*sqrt(3)"},
	{"x = 2x", "ambiguous-unit", "2x", "x = 2*x"},
	{"x = 2max(a, b)", "ambiguous-unit", "2max(a, b)", "x = 2*max(a, b)"},
	{"x = 25 mm^n", "syntax", "25 mm^n", "x = (25 mm)^n"},
	{"x = 25 mm^(n + 1)", "syntax", "25 mm^(n + 1)", "x = (25 mm)^(n + 1)"},
	{"x = 25 mm^2.5", "syntax", "25 mm^2.5", "x = (25 mm)^2.5"},
	{"x [kNn] = P", "unknown-unit", "kNn", "x [kN] = P"},
	{"x [kips] = P", "wrong-unit-spelling", "kips", "x [kip] = P"},
	{"x [lb] = P", "wrong-unit-spelling", "lb", "x [lbf] = P"},
	{"x [kN m] = P", "syntax", " ", "x [kN*m] = P"},
	{"x [] = P", "syntax", "[]", "x [number] = P"},
	{"x [-] = P", "syntax", "[-]", "x [number] = P"},
	{"x [column of length] = P", "syntax", "[column of length]", "x [length] = P"},
	{"x [MPa = P", "syntax", "[", "x [MPa] = P"},
	{"tau MPa = P/A", "syntax", "MPa", "tau [MPa] = P/A"},
	{"M kN*m = P*a", "syntax", "kN*m", "M [kN*m] = P*a"},
	{"x = P kN", "syntax", "kN", "x = P*1 kN"},
	// operators and brackets
	{"x = 2 (a+b)", "syntax", "2 (a+b)", "x = 2*(a+b)"},
	{"x = 2 kN (m)", "syntax", "2 kN (m)", "x = 2 kN * (m)"},
	{"x = 2(a+b)", "syntax", "2(a+b)", "x = 2*(a+b)"},
	{"x = (a) (b + c)", "syntax", "(a) (b + c)", "x = (a)*(b + c)"},
	{"x = f(a) b", "syntax", "f(a) b", "x = f(a)*b"},
	{"x = a b", "syntax", "a b", "x = a*b"},
	{"x = a 2", "syntax", "a 2", "x = a*2"},
	{"x = 2√3", "syntax", "2√3", "x = 2*√3"},
	{"x = a +", "syntax", "+", "x = a + b"},
	{"x =", "syntax", "=", "x = 3"},
	{"x = * a", "syntax", "*", "x = a"},
	{"x = a + * b", "syntax", "*", "x = a * b"},
	{"x = a ** 2", "syntax", "**", "x = a ^ 2"},
	{"x = a – b", "syntax", "–", "x = a - b"},
	{"x = (a + b", "syntax", "(", "x = (a + b)"},
	{"x = max(a, b", "syntax", "(", "x = max(a, b)"},
	{"x = a) + b", "syntax", ")", "x = (a) + b"},
	{"x = ()", "syntax", ")", "x = (a)"},
	{"x = a]", "syntax", "]", "x = a"},
	{"x = {a}", "syntax", "{", "x = (a)"},
	{"x = [a]", "syntax", "[", "x = (a)"},
	{"x = a²²^2", "syntax", "^", "x = (a²²)^2"},
	{"x = a⁻", "syntax", "⁻", "x = a⁻¹"},
	{"x = √a²", "syntax", "√a²", "x = √(a²)"},
	{"x = √a^2", "syntax", "√a^2", "x = (√a)^2"},
	{"x = |a|", "syntax", "|", "x = abs(a)"},
	{"x = a;", "syntax", ";", "x = a"},
	{"x := a", "syntax", ":=", "x = a"},
	{"x: 3", "syntax", ":", "x = 3"},
	{"x = a @ b", "syntax", "@", "x = a * b"},
	{"x = a // a remark", "syntax", "//", "x = a # a remark"},
	{"x = \"abc", "syntax", "\"abc", "x = \"abc\""},
	{"x = “abc”", "syntax", "“", "x = \"abc\""},
	{"x = 'abc'", "syntax", "'", "x = \"abc\""},
	{"x = `a`", "syntax", "`", "x = a"},
	{"_x = 3", "syntax", "_", "x = 3"},
	{"σ₁ = 3", "syntax", "₁", "σ_1 = 3"},
	{"x = τ₁₂*2", "syntax", "₁₂", "x = τ_12*2"},
	{"P = 48 kN [drawing S-12]", "syntax", "[drawing S-12]", "P = 48 kN # [drawing S-12]"},
	{"tau = P/A [MPa]", "syntax", "[MPa]", "tau [MPa] = P/A"},
	{"x = bolts[1]", "syntax", "[1]", "x = bolts at \"B1\""},
	{"x = sqrt 2", "syntax", "sqrt 2", "x = sqrt(2)"},
	{"x = 1.5,200", "syntax", ",", "x = 1.5"},
	{"x = a.5", "syntax", "a.5", "x = a*.5"},
	{"x = pin(a, b).tau*2", "syntax", ".tau", "x = pin.tau*2"},
	{"k = (3 if a < b\n= 4 otherwise", "syntax", "if", "k = 3 if a < b\n= 4 otherwise"},
	{"x = max(a otherwise)", "syntax", "otherwise", "x = max(a)"},
	// characters
	{"x = a + אב", "unsupported-character", "א", "x = a + b"},
	{"x = e\u0301", "unsupported-character", "e\u0301", "x = é"},
	{"x = y\u0304 + 1", "unsupported-character", "y\u0304", "x = ȳ + 1"},
	{"x = n\u0304", "unsupported-character", "n\u0304", "x = n_bar"},
	{"x = a\x00b", "unsupported-character", "\x00", "x = ab"},
	{"x = a\u202eb", "unsupported-character", "\u202e", "x = ab"},
	{"x = a\u200bb", "unsupported-character", "\u200b", "x = ab"},
	{"x = а + b", "unsupported-character", "а", "x = a + b"}, // a Cyrillic letter
	{"x = 5 😀", "unsupported-character", "😀", "x = 5"},
	// calls
	{"x = sqrt(a,)", "syntax", ",", "x = sqrt(a)"},
	{"x = max(a,,b)", "syntax", ",", "x = max(a, b)"},
	{"x = f(a=1, 2)", "syntax", "2", "x = f(a=1, b=2)"},
	{"x = f(s.a = 1)", "syntax", "s.a", "x = f(a = 1)"},
	{"x = f(if=1)", "syntax", "if", "x = f(a = 1)"},
	{"x = f(a over bolts)", "syntax", "bolts", "x = max(a over bolts)"},
	{"x = max(a over bolts, b)", "syntax", "bolts", "x = max(a over bolts)"},
	{"x = max(a over)", "syntax", "over", "x = max(a over bolts)"},
	{"x = a over bolts", "syntax", "over", "x = max(a over bolts)"},
	// conditions
	{"x = a <= b", "syntax", "a <= b", "check a <= b"},
	{"x = (a <= b) + 1", "syntax", "(a <= b)", "x = 1 if a <= b"},
	{"x = f(a < b)", "syntax", "a < b", "x = f(a)"},
	{"x = -(a < b)", "syntax", "(a < b)", "x = -a"},
	{"x = a + not b", "syntax", "not", "x = a"},
	{"x = a and b", "syntax", "a", ""},
	{"x = 3 if t", "syntax", "t", "x = 3 if t > 2 mm"},
	{"x = 3 if a < b and t", "syntax", "t", "x = 3 if a < b and t > 2 mm"},
	{"x = 3 if a < b > c", "syntax", ">", "x = 3 if a < b and b > c"},
	{"x = 3 if a < b == c", "syntax", "==", "x = 3 if a < b and b == c"},
	{"x = 3 if a != b != c", "syntax", "!=", "x = 3 if a != b and b != c"},
	{"x = 3 if a =< b", "syntax", "=<", "x = 3 if a <= b"},
	{"x = 3 if a <> b", "syntax", "<>", "x = 3 if a != b"},
	{"x = 3 if a < b && c < d", "syntax", "&&", "x = 3 if a < b and c < d"},
	{"x = 3 if", "syntax", "if", "x = 3 if a < b"},
	{"x = 3 if a = b", "syntax", "=", "x = 3 if a == b"},
	{"check a <= b if c = \"x\"", "syntax", "=", "check a <= b if c == \"x\""},
	// checks
	{"check a", "syntax", "a", "check a <= b"},
	{"check", "syntax", "check", "check a <= b"},
	{"check a + b", "syntax", "a + b", "check a <= b"},
	{"check a = b", "syntax", "=", "check a == b"},
	{"check a [mm] <= b", "syntax", "[mm]", "check a <= b"},
	{"x = 2*cos 5 deg 30 arcmin", "syntax", "cos 5 deg 30 arcmin", "x = 2*cos(5 deg 30 arcmin)"},
	{"x = sqrt 1/2 in", "syntax", "sqrt 1/2 in", "x = sqrt(1/2 in)"},
	{"check a != b", "syntax", "!=", "check a <= b"},
	{"check not a < b", "syntax", "not a < b", "check a >= b"},
	{"check a < b or c < d", "syntax", "a < b or c < d", "check a < max(b, c)"},
	{"check a <= b and c <= d", "syntax", "check a <= b and c <= d", "check a <= b\ncheck c <= d"},
	{"check a <= b and c <= d and e < f", "syntax", "check a <= b and c <= d and e < f", "check a <= b\ncheck c <= d\ncheck e < f"},
	{"check (a <= b) <= c", "syntax", "(a <= b)", "check a <= b <= c"},
	{"check a <= b if c", "syntax", "c", "check a <= b if c > d"},
	{"check a <= b otherwise", "syntax", "otherwise", "check a <= b"},
	{"check a <= b, c <= d", "syntax", ",", "check a <= b"},
	{"Check tau <= tau_d", "syntax", "Check", "check tau <= tau_d"},
	{"tau <= tau_d", "syntax", "tau <= tau_d", "check tau <= tau_d"},
	// statements
	{"P", "syntax", "P", "P = 3"},
	{"P [kN]", "syntax", "P [kN]", "P [kN] = 3 kN"},
	{"x y = 3", "syntax", "y", "x = 3"},
	{"x == 3", "syntax", "==", "x = 3"},
	{"x = y = 3", "syntax", "=", "x = 3"},
	{"if = 3", "syntax", "if", "i = 3"},
	{"first = 3", "syntax", "first", "f = 3"},
	{"x = where", "syntax", "where", "x = w"},
	{"x = a + check", "syntax", "check", "x = a"},
	{"2d = 3", "syntax", "2d", "d_2 = 3"},
	{"+ 3", "syntax", "+", "x = 3"},
	{"(a) = 3", "syntax", "(", "a = 3"},
	{"= 3", "syntax", "=", "x = 3"},
	{"bolts.x = 3", "syntax", "bolts.x", "bolts_x = 3"},
	{"needs a < b", "syntax", "needs", "check a < b"},
	{"gives tau", "syntax", "gives", ""},
	{"where d [mm]", "syntax", "where", ""},
	{"otherwise", "syntax", "otherwise", ""},
	{"f(a, a) = 3", "redefined", "a", "f(a, b) = 3"},
	{"f(a.b) = 3", "syntax", "a.b", "f(a) = 3"},
	{"f(2) = 3", "syntax", "2", "f(a) = 3"},
	{"f(a [mm]) = 3", "syntax", "[", "f(a) = 3"},
	{"f(max(a)) = 3", "syntax", "(", "f(a) = 3"},
	{"f(a b) = 3", "syntax", "b", "f(a, b) = 3"},
	{"f(a=1) = 3", "syntax", "=", "f(a) = 3"},
	{"f(if) = 3", "syntax", "if", "f(a) = 3"},
	// branches
	{"k = 3 if a < b\n= 4", "syntax", "4", "k = 3 if a < b\n= 4 otherwise"},
	{"k = 3\n= 4 otherwise", "syntax", "=", "k = 3 if a < b\n= 4 otherwise"},
	{"k = 3 if a < b\n= 4 otherwise\n= 5 otherwise", "syntax", "=", "k = 3 if a < b\n= 4 otherwise"},
	{"k = 3 otherwise", "syntax", "otherwise", "k = 3"},
	{"k = 3 if a < b else 4", "syntax", "else", "k = 3 if a < b\n= 4 otherwise"},
	{"k = 3 if a < b, 4 otherwise", "syntax", ",", "k = 3 if a < b\n= 4 otherwise"},
	{"k = if a < b 3", "syntax", "if", "k = 3 if a < b"},
	{"k = 3 if a < b\n= 4 else", "syntax", "else", "k = 3 if a < b\n= 4 otherwise"},
	{"k = 3 if a < b\n= first of 3, 4 with k > 2", "syntax", "first", ""},
	// where
	{"M = 0.3*d^2.6 where d [mm]", "syntax", "M", "M [N*mm] = 0.3*d^2.6 where d [mm]"},
	{"M [moment] = 0.3*d^2.6 where d [mm]", "syntax", "M", "M [N*mm] = 0.3*d^2.6 where d [mm]"},
	{"k = 0.3*d where d [mm]", "syntax", "k", "k [number] = 0.3*d where d [mm]"},
	{"M [kN] = 2*d where d", "syntax", "d", "M [kN] = 2*d where d [mm]"},
	{"M [kN] = 2*d where", "syntax", "where", "M [kN] = 2*d where d [mm]"},
	{"M [kN] = 2*d where d [length]", "syntax", "[length]", "M [kN] = 2*d where d [mm]"},
	{"M [kN] = 2*d where d [mm], d [mm]", "syntax", "d", "M [kN] = 2*d where d [mm]"},
	{"M [kN] = 2*d where 3", "syntax", "3", "M [kN] = 2*d where d [mm]"},
	{"check a < b where a [mm]", "syntax", "where", "check a < b"},
	// first of
	{"t = first of 6 mm, 8 mm", "syntax", "first of 6 mm, 8 mm", "t = first of 6 mm, 8 mm with t > 3 mm"},
	{"t = first 6 mm", "syntax", "first", "t = 6 mm"},
	{"t = first of 6 mm with t", "syntax", "t", "t = first of 6 mm with t > 3 mm"},
	{"t = first of with t > 3 mm", "syntax", "with", "t = first of 6 mm with t > 3 mm"},
	{"t = first of 6 mm with t > 3 mm if a < b", "syntax", "if", "t = first of 6 mm with t > 3 mm"},
	{"t = 2*first of 6 mm with t > 3 mm", "syntax", "first", ""},
}

// shown finds the corrections in a hint: the quoted fragments behind `write`
// or `did you mean`.
var shown = regexp.MustCompile("`([^`]+)`")

func corrections(d diag.Diagnostic) []string {
	var list []string
	for _, h := range d.Hints {
		i := strings.Index(h, "write `")
		if j := strings.Index(h, "did you mean"); j >= 0 {
			i = j
		}
		if i < 0 {
			continue
		}
		h, _, _ = strings.Cut(h[i:], ";")
		for _, m := range shown.FindAllStringSubmatch(h, -1) {
			list = append(list, m[1])
		}
	}
	return list
}

func parseCalc(source string) (*diag.Source, *Block, []diag.Diagnostic) {
	src, parse := fenced("calc", source+"\n")
	b, diags := parse()
	return src, b, diags
}

func TestMistakes(t *testing.T) {
	for _, test := range mistakes {
		src, b, diags := parseCalc(test.source)
		if len(diags) != 1 {
			t.Errorf("%q: %d diagnostics, want 1", test.source, len(diags))
			for _, d := range diags {
				t.Log(d.Text())
			}
			continue
		}
		d := diags[0]
		if d.ID != test.id || src.Slice(d.Span) != test.under {
			t.Errorf("%q: got %s at %q, want %s at %q\n%s", test.source, d.ID, src.Slice(d.Span), test.id, test.under, d.Text())
		}
		if _, ok := b.Stmts[0].(*BadStmt); !ok {
			t.Errorf("%q: the tree has %T", test.source, b.Stmts[0])
		}
		if test.corrected != "" {
			if _, _, diags := parseCalc(test.corrected); len(diags) > 0 {
				t.Errorf("%q: the corrected line has a mistake: %s", test.source, diags[0].Text())
			}
		}
		found := false
		list := corrections(d)
		for _, c := range list {
			fixed := string(src.Text[8:d.Span.Start]) + c + string(src.Text[d.Span.End:])
			if _, _, diags := parseCalc(fixed); len(diags) > 0 {
				t.Errorf("%q: the correction %q gives %s", test.source, c, diags[0].Text())
			}
			found = found || strings.TrimSpace(fixed) == test.corrected || strings.Contains(test.corrected, "\n")
		}
		if len(list) > 0 && !found {
			t.Errorf("%q: the hints show %q, none of which makes %q", test.source, list, test.corrected)
		}
		if m := d.Message; m == "" || strings.HasSuffix(m, ".") || m != strings.ToValidUTF8(m, "") {
			t.Errorf("%q: message %q", test.source, m)
		}
	}
}
