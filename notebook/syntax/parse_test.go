package syntax

import (
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gusset/notebook/diag"
)

// tree parses a fence and returns its dump; diagnostics fail the test.
func tree(t *testing.T, info, content string) string {
	t.Helper()
	_, parse := fenced(info, content)
	b, diags := parse()
	for _, d := range diags {
		t.Errorf("%s %s", d.ID, d.Text())
	}
	var out strings.Builder
	if err := Dump(&out, b); err != nil {
		t.Fatal(err)
	}
	return out.String()
}

// exprTests give the tree of right sides: NOTATION sections 3 and 4.
var exprTests = []struct{ source, want string }{
	// precedence
	{`-2^2`, `(- (^ 2 2))`},
	{`2^-1`, `(^ 2 (- 1))`},
	{`2^3^2`, `(^ 2 (^ 3 2))`},
	{`2^-x^2`, `(^ 2 (- (^ x 2)))`},
	{`a - b - c`, `(- (- a b) c)`},
	{`a/b/c*d`, `(* (/ (/ a b) c) d)`},
	{`a + b*c^2`, `(+ a (* b (^ c 2)))`},
	{`a*-b`, `(* a (- b))`},
	{`a - -b`, `(- a (- b))`},
	{`-a*b`, `(* (- a) b)`},
	{`+70`, `70`},
	{`(a + b)*c`, `(* (paren (+ a b)) c)`},
	{`t.f at grade^2`, `(^ (at t.f grade) 2)`},
	{`-t.f at "M 1"`, `(- (at t.f "M 1"))`},
	{`a*t.f at m + 1`, `(+ (* a (at t.f m)) 1)`},
	{`steels.f_y at members.grade at x`, `(at (at steels.f_y members.grade) x)`},
	// spellings beyond ASCII
	{`a×b·c÷d − e`, `(- (/ (* (* a b) c) d) e)`},
	{`√3*f`, `(* (call sqrt 3) f)`},
	{`√(x + 1)`, `(call sqrt (+ x 1))`},
	{`d²`, `(^ d 2)`},
	{`d⁻¹²`, `(^ d (- 12))`},
	{`-d²`, `(- (^ d 2))`},
	{`(a + b)³`, `(^ (paren (+ a b)) 3)`},
	{"12\u00a0mm\u202f+ a", `(+ 12_mm a)`},
	{`σ_x + sigma_x + Δϕ_ε`, `(+ (+ sigma_x sigma_x) Deltaphi_epsilon)`},
	// numbers
	{`12_500`, `12_500`},
	{`.5`, `.5`},
	{`1.2e-3 + 2.1E5`, `(+ 1.2e-3 2.1E5)`},
	{`5 %`, `5_%`},
	{`5% + 3‰`, `(+ 5_% 3_‰)`},
	{`3/4 in`, `3/4_in`},
	{`3/4in`, `3/4_in`},
	{`1 3/8 in`, `1+3/8_in`},
	{`-1 3/8 in`, `(- 1+3/8_in)`},
	{`2*3/4 in`, `(* 2 3/4_in)`},
	{`P/3/4 in`, `(/ (/ P 3) 4_in)`},
	{`2^3/4 in`, `(/ (^ 2 3) 4_in)`},
	{`3/4`, `(/ 3 4)`},
	{`3 / 4 in`, `(/ 3 4_in)`},
	{`3/4*d`, `(* (/ 3 4) d)`},
	{`12 ft 6 in`, `12_ft&6_in`},
	{`12 ft 6 1/2 in`, `12_ft&6+1/2_in`},
	{`12 ft 1/2 in`, `12_ft&1/2_in`},
	{`a/12 ft 6 1/2 in`, `(/ a 12_ft&6+1/2_in)`},
	{`-12 ft 6 in`, `(- 12_ft&6_in)`},
	{`1 yd 2 ft 3.5 in`, `1_yd&2_ft&3.5_in`},
	{`5 deg 30 arcmin`, `5_deg&30_arcmin`},
	{`5° 30 arcmin`, `5_°&30_arcmin`},
	{`1 h 30 min`, `1_h&30_min`},
	{`12 ft - 6 in`, `(- 12_ft 6_in)`},
	{`10 mm-2 mm`, `(- 10_mm 2_mm)`},
	// temperatures
	{`-40 degC`, `-40_degC`},
	{`- 40 degC`, `(- 40_degC)`},
	{`T - 40 degC`, `(- T 40_degC)`},
	{`T -40 degC`, `(- T 40_degC)`},
	{`max(-40 °F, T)`, `(call max -40_°F T)`},
	{`-40 K`, `(- 40_K)`},
	// units end
	{`48kN`, `48_kN`},
	{`25 mm^2`, `25_mm^2`},
	{`(25 mm)^2`, `(^ (paren 25_mm) 2)`},
	{`25 mm²`, `25_mm²`},
	{`3 m^-1`, `3_m^-1`},
	{`3 MPa*m^(1/2)`, `3_MPa*m^(1/2)`},
	{`48 kN / w`, `(/ 48_kN w)`},
	{`48 kN/ w`, `(/ 48_kN w)`},
	{`48 kN /w`, `(/ 48_kN w)`},
	{`48 kN/m`, `48_kN/m`},
	{`355 MPa/1.1`, `(/ 355_MPa 1.1)`},
	{`355 MPa/.5`, `(/ 355_MPa .5)`},
	{`490 MPa/sqrt(3)`, `(/ 490_MPa (call sqrt 3))`},
	{`490 MPa*min(a, b)`, `(* 490_MPa (call min a b))`},
	{`490 MPa/√3`, `(/ 490_MPa (call sqrt 3))`},
	{`490 MPa/-x`, `(/ 490_MPa (- x))`},
	{`10 mm*20 mm`, `(* 10_mm 20_mm)`},
	{`48 kN/(b*t)`, `(/ 48_kN (paren (* b t)))`},
	{`48 kN/(2*m)`, `(/ 48_kN (paren (* 2 m)))`},
	{`5 kg/(m*s^2)`, `5_kg/(m*s^2)`},
	{`5 J/(kg*K)*2`, `(* 5_J/(kg*K) 2)`},
	{`12e-6 1/K`, `12e-6_1/K`},
	{`12e-6 1/(m*K)`, `12e-6_1/(m*K)`},
	{`12e-6/K`, `(/ 12e-6 K)`}, // a value K, or the checker shows 12e-6 1/K
	{`2 1/s`, `2_1/s`},
	{`3 kip-ft`, `3_kip-ft`},
	{`3 kN-m + a`, `(+ 3_kN-m a)`},
	{`3 in-lbf`, `3_in-lbf`},
	{`10 mm-d`, `(- 10_mm d)`},
	{`10 mm-kN`, `10_mm-kN`},
	{`5 N·mm`, `5_N·mm`},
	{`20 °C`, `20_°C`},
	{`2 Ω + 3 µm`, `(+ 2_Ω 3_µm)`},
	{`5 % * x`, `(* 5_% x)`},
	// calls
	{`f()`, `(call f)`},
	{`f(a, 2 mm)`, `(call f a 2_mm)`},
	{`shop.bracket(F, t=5 mm, n = 2)`, `(call shop.bracket F t=5_mm n=2)`},
	{`sqrt (2)`, `(call sqrt 2)`},
	{`min + min(a)`, `(+ min (call min a))`},
	{`max(F over bolts)`, `(call max F over bolts)`},
	{`sum(F*x over loads.cases)`, `(call sum (* F x) over loads.cases)`},
	{`max(a,200 mm)`, `(call max a 200_mm)`},
	{`max(1.5,200)`, `(call max 1.5 200)`},
	{`max(1, 200)`, `(call max 1 200)`},
	{`"S355"`, `"S355"`},
	{`f_c' + f'_c`, `(+ f_c' f'_c)`},
	// conditions
	{`a <= b`, `(a <= b)`},
	{`a < b <= c`, `(a < b <= c)`},
	{`a + 1 ≥ b*2`, `((+ a 1) >= (* b 2))`},
	{`a == b == c`, `(a == b == c)`},
	{`a ≠ b`, `(a != b)`},
	{`not a < b and c > d or e == "x"`, `(or (and (not (a < b)) (c > d)) (e == "x"))`},
	{`a < b or c < d and e < f`, `(or (a < b) (and (c < d) (e < f)))`},
	{`(a < b or c < d) and e < f`, `(and (paren (or (a < b) (c < d))) (e < f))`},
	{`not (a < b)`, `(not (paren (a < b)))`},
}

func TestExpressions(t *testing.T) {
	for _, test := range exprTests {
		src := diag.NewSource("x.md", []byte(test.source))
		e, diags := ParseExpr(src, diag.Span{Start: 0, End: len(test.source)})
		if got := DumpExpr(e); got != test.want {
			t.Errorf("%s\n got %s\nwant %s", test.source, got, test.want)
		}
		for _, d := range diags {
			t.Errorf("%s: %s", test.source, d.Text())
		}
	}
}

// blockTests give the trees of whole fences.
var blockTests = []struct{ name, info, content, want string }{
	{"givens", "calc", `
P     = 48 kN          # Pull on one lug, factored [load schedule, row 7]
grade = "S355 # not a note"   # Plate grade [drawing S-12]
nu    = 0.3            # Poisson's ratio
x = 3# [only a source]
y = 4 # see [2] for more
z = 4 # text [EN [1] 3.2]
`, `
calc
  def P 48_kN # Pull on one lug, factored [load schedule, row 7]
  def grade "S355 # not a note" # Plate grade [drawing S-12]
  def nu 0.3 # Poisson's ratio
  def x 3 [only a source]
  def y 4 # see [2] for more
  def z 4 # text [EN [1] 3.2]
`},
	{"gaps, remarks and notes", "calc brief full  # shown small [basis]", `

a = 1


// never printed
b = 2
// neither

## A heading [source]
c = 3

`, `
calc brief full # shown small [basis]
  def a 1
  gap
  def b 2
  gap
  note # A heading [source]
  def c 3
`},
	{"declared units and functions", "calc", `
tau [MPa] = P/(2*A)
a[mm]=3
s [stress] = P/A
bearing(F, d, t) [MPa] = F/(d*t)  # Average
f () = 3
M [N*mm] = 0.3*f_u*d^2.6   where f_u [MPa], d [mm]     # Yield [EN 1995-1-1, 8.14]
`, `
calc
  def tau [MPa] (/ P (paren (* 2 A)))
  def a [mm] 3
  def s [stress] (/ P A)
  def bearing(F d t) [MPa] (/ F (paren (* d t))) # Average
  def f() 3
  def M [N*mm] (* (* 0.3 f_u) (^ d 2.6)) where f_u [MPa] d [mm] # Yield [EN 1995-1-1, 8.14]
`},
	{"branches", "calc", `
k = 0.85   if t <= 25 mm   # Factor [x]
// a remark between

  = 0.75   if t <= 40 mm   # its own note
  = 0.65   otherwise

j [kN] = 2*d if d > 1 mm
       = 3*d otherwise # First note
       where d [mm]    # Second
m [kN] = 2*d
where d [mm] # Note
`, `
calc
  def k 0.85 if (t <= 25_mm)
      0.75 if (t <= 40_mm) # its own note
      0.65 otherwise # Factor [x]
  gap
  def j [kN] (* 2 d) if (d > 1_mm)
      (* 3 d) otherwise where d [mm] # First note
  def m [kN] (* 2 d) where d [mm] # Note
`},
	{"checks", "calc", `
check tau <= tau_d                       # Pin in double shear [EN 1993-1-8, Table 3.10]
check (N/N_d)^2 + (V/V_d)^2 <= 1
check 1.2*d_0 <= e_1 <= 4*t + 40 mm
check (a < b)
check V_Ed <= V_b_Rd if lambda > lambda_lim and a == b # why
`, `
calc
  check (tau <= tau_d) # Pin in double shear [EN 1993-1-8, Table 3.10]
  check ((+ (^ (paren (/ N N_d)) 2) (^ (paren (/ V V_d)) 2)) <= 1)
  check ((* 1.2 d_0) <= e_1 <= (+ (* 4 t) 40_mm))
  check (paren (a < b))
  check (V_Ed <= V_b_Rd) if (and (lambda > lambda_lim) (a == b)) # why
`},
	{"continuation", "calc", `
a = b +   # first note counts
  c -     # this one does not
  d
jnt = dowel(t_1=38 mm,
   # a note alone
   d = 12 mm,
   f_h1 = f_h)
g = (1
  + 2
)
t = first of 6 mm,
  8 mm, 10 mm with
  P/(2*b*t) <= tau_d and
  t > 3 mm
q =
  3 mm
check a < b
check_1 = 2
`, `
calc
  def a (- (+ b c) d) # first note counts
  def jnt (call dowel t_1=38_mm d=12_mm f_h1=f_h) # a note alone
  def g (paren (+ 1 2))
  def t (first 6_mm 8_mm 10_mm with (and ((/ P (paren (* (* 2 b) t))) <= tau_d) (t > 3_mm)))
  def q 3_mm
  check (a < b)
  def check_1 2
`},
	{"helper", "helper direct_shear  # Average shear stress on parallel planes [equilibrium]", `
V [force]               # Shear force
A [column of area]      # Areas
// remark

g [length] = 0
phi = 0.75 # factor
theta [angle] = -30 deg
grade = "S235"
x [kN]
needs n >= 1 else warn  # Table 3
c = 3
needs a < b and c < d
tau [stress] = V/(n*A)  # Average
k = 1 if tau > 0 MPa
  = 2 otherwise
gives tau, k
`, `
helper direct_shear # Average shear stress on parallel planes [equilibrium]
  param V [force] # Shear force
  param A [column of area] # Areas
  param g [length] = 0
  param phi = 0.75 # factor
  param theta [angle] = (- 30_deg)
  param grade = "S235"
  param x [kN]
  needs (n >= 1) else warn # Table 3
  def c 3
  needs (and (a < b) (c < d))
  def tau [stress] (/ V (paren (* n A))) # Average
  def k 1 if (tau > 0_MPa)
      2 otherwise
  gives tau k
`},
	{"schedule", "schedule bolts full # Positions [drawing S-12]", `
// remark
mark | x [mm] | y [in]
-----|-------:|---
B1   |    -70 |  3/4
"B 2"   |  +70 |     -1 1/8

#5 | 2*a + 3 mm | 5 ft 6 in |
| B\|4 | | "x|y" |
`, `
schedule full bolts # Positions [drawing S-12]
  columns mark, x [mm], y [in]
  row B1 | (- 70) | 3/4
  row "B 2" | 70 | (- 1+1/8)
  row text "#5" | (+ (* 2 a) 3_mm) | 5_ft&6_in
  row text "B|4" | - | "x|y"
`},
	{"schedule without outer pipes keeps an empty first cell", "schedule s", `
mark | x
 | 3
a |
`, `
schedule s
  columns mark, x
  row - | 3
  row a | -
`},
	{"schedule from a file", "schedule bolts from \"my bolts.csv\" # [S-12]", "", `
schedule bolts from "my bolts.csv" [S-12]
  columns
`},
	{"cases", "cases", `
| case | P [kN] |
|:-----|-------:|
| LC1  | 1.35*G |
`, `
cases cases
  columns case, P [kN]
  row LC1 | (* 1.35 G)
`},
	{"cases with a name", "cases wind", "case | q [kPa]\nW1 | .5", `
cases wind
  columns case, q [kPa]
  row W1 | .5
`},
	{"plot", "plot  # Stress over diameter", `
# a note line
tau, jnt.F against d from 16 to 2*d_max   # curves
limit tau_d,
  tau_y
steps 400
title  Shear stress, double shear
`, `
plot # Stress over diameter
  curves tau jnt.F against d from 16 to (* 2 d_max)
  limit tau_d tau_y
  steps 400
  title Shear stress, double shear
`},
	{"plot with its steps behind the range", "plot", "tau against d from 1 mm to 2*steps steps 40 # Stress", `
plot
  curves tau against d from 1_mm to (* 2 steps)
  steps 40
`},
	{"plot names that are words elsewhere", "plot", "limit, steps against title from 1 to 2", `
plot
  curves limit steps against title from 1 to 2
`},
	{"plot checks", "plot checks", "", "\nplot\n  checks\n"},
	{"plot checks as a line", "plot", "plot checks\ntitle \"All checks\"", "\nplot\n  checks\n  title All checks\n"},
	{"figure", "figure shear-angle gamma # Exaggerated", "", `
figure shear-angle gamma # Exaggerated
`},
	{"figure over lines", "figure pin", `
P, d = 25 mm   # Pin
// remark
t_1 = 6 mm,
t_2 = 10
`, `
figure pin P d=25_mm t_1=6_mm t_2=10 # Pin
`},
}

func TestBlocks(t *testing.T) {
	for _, test := range blockTests {
		t.Run(test.name, func(t *testing.T) {
			got := "\n" + tree(t, test.info, strings.TrimPrefix(test.content, "\n"))
			if diff := cmp.Diff(test.want, got); diff != "" {
				t.Error(diff)
			}
		})
	}
}
