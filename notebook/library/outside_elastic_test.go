package library_test

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/mat"
)

const (
	byHand   = "by hand"
	gere     = "Gere & Goodno, Mechanics of Materials, from memory: "
	timosh   = "Timoshenko & Goodier, Theory of Elasticity, art. 109, table, from memory"
	en10210  = "EN 10210-2, from memory"
	ennu     = "EN 1993-1-1, 3.2.6"
	wahl     = "Shigley, Mechanical Engineering Design, Wahl factors of 4 to 10, from memory, and of 12 by hand"
	strip    = "strips added up"
	rotation = "rotation of the tensor by matrices"
)

func stressRows() []row {
	return []row{
		{call: "axial_stress(10 kip, 2 in^2)", want: "r = 34.473785 MPa", tol: 1e-7, source: "NIST SP 811, B.8: 1 ksi = 6.894 757 MPa"},
		{call: "axial_stress(-110 kN, pi*(20 mm)^2/4)", want: "r = -350 MPa", tol: 1e-3, source: gere + "the punch of Example 1-6"},
		{call: "axial_strain(delta=1/16 in, L=5 ft)", want: "r = 1/960", source: byHand + ": 1/16 in on 60 in"},
		{call: "axial_elongation(N=27 kN, L=3 m, A=450 mm^2, E=200 GPa)", want: "r.sigma = 60 MPa; r.epsilon = 300 ustrain; r.delta = 0.9 mm; 27 kN * r.delta/2 = (60 MPa)^2/(2*200 GPa)*450 mm^2*3 m",
			source: "work of the force is the strain energy"},
		{call: "direct_shear(50 kN, 201.06193 mm^2, n=2)", want: "r = 124.34 MPa", tol: 1e-5, source: byHand + ": M16 in two planes"},
		{call: "direct_shear(V=26.5 kip, A=0.4418 in^2)", want: "r = 60 ksi", tol: 1e-3, source: "AISC Manual, Table 7-1: r_n of a 3/4 in A490 bolt at F_nv = 60 ksi, from memory"},
		{call: "shear_strain(30 mm, 30 mm)", want: "r.gamma = 45 deg; r.gamma_small = 1", source: "the diagonal of a square"},
		{call: "shear_strain(0.5 mm, 20 mm)", want: "r.gamma_small = 0.025; tan(r.gamma) = 0.025", source: "definition"},
		{call: "shear_modulus(210 GPa, 0.3)", want: "r = 81 GPa", tol: 0.003, source: ennu + ": G about 81 000 N/mm²"},
		{call: "shear_modulus(29000 ksi, 0.3)", want: "r = 11200 ksi", tol: 0.005, source: "ANSI/AISC 360-16, G = 11 200 ksi"},
		{call: "poisson_ratio(210 GPa, 81 GPa)", want: "r = 0.3", tol: 0.013, source: ennu},
		{call: "bulk_modulus(210 GPa, 0.3)", want: "r = 175 GPa; 9*r*(210 GPa/2.6)/(3*r + 210 GPa/2.6) = 210 GPa", source: "E = 9·K·G/(3·K + G)"},
		{call: "shear_yield_mises(355 MPa)", want: "r/(355 MPa) = 0.57735", tol: 1e-5, source: "von Mises: 1/√3"},
		{call: "shear_yield_tresca(355 MPa)", want: "r/(355 MPa) = 0.5", source: "Tresca: 1/2"},
		{setup: "s = plane_stress(0 MPa, 0 MPa, 204.9593 MPa)", call: "shear_yield_mises(s.sigma_v)", want: "r = 204.9593 MPa", source: "the state of pure shear yields at it"},
		{setup: "s = plane_stress(0 MPa, 0 MPa, 177.5 MPa)", call: "shear_yield_tresca(s.sigma_tresca)", want: "r = 177.5 MPa", source: "the state of pure shear yields at it"},
		{call: "shear_response(0.001, 80 GPa, 200 MPa)", want: "r.tau = 80 MPa; r.gamma_y = 0.0025; r.mu = 0.4", source: byHand},
		{call: "shear_response(0.01, 80 GPa, 200 MPa)", want: "r.tau = 200 MPa; r.mu = 4", source: byHand},
		{call: "shear_response(-0.01, 80 GPa, 200 MPa)", want: "r.tau = -200 MPa; r.mu = -4", source: byHand},
		{call: "shear_deflection(V=10 kN, L=1 m, G=80 GPa, A_s=5/6*5000 mm^2)", want: "r.delta = 6/5*10 kN*1 m/(80 GPa*5000 mm^2); r.gamma = 30 ustrain", source: "Roark: 6/5·P·l/(A·G) of a rectangular cantilever"},
		{call: "thermal_stress(12e-6 1/K, 1 K, 210 GPa)", want: "r.sigma = -2.52 MPa; r.epsilon = 12 ustrain", source: "rail steel, 2.5 N/mm² for each kelvin, common practice"},
		{call: "thermal_stress(6.5e-6 1/degF, -50 degR, 29000 ksi)", want: "r.sigma = 9.425 ksi; r.epsilon = -325 ustrain", source: byHand},
	}
}

// pinMoment integrates the bearing pressures on one half of a pin about its middle.
func pinMoment(p, t1, t2, g float64) float64 {
	const n = 1000
	m := 0.0
	for i := range n {
		s := (float64(i) + 0.5) / n
		m += p / 2 / n * (t2/2 + g + s*t1)
		m -= p / 2 / n * (s * t2 / 2)
	}
	return m
}

// shearLag integrates Volkersen's equations of a lap joint by steps: the force in the first adherend
// falls from P to 0, by the shear that the difference of the stretched adherends brings about.
func shearLag(p, b, l, t1, t2, e1, e2, ta, ga float64) (largest float64) {
	const n = 20000
	h := l / n
	// two starts, superposed so that the far end comes out right: y = (N_1, tau)
	run := func(n1, tau float64) (end, peak [2]float64) {
		slope := func(n1, tau float64) (float64, float64) {
			return -tau * b, -ga / ta * (n1/(b*t1*e1) - (p-n1)/(b*t2*e2))
		}
		start := tau
		for range n {
			a1, a2 := slope(n1, tau)
			b1, b2 := slope(n1+h/2*a1, tau+h/2*a2)
			c1, c2 := slope(n1+h/2*b1, tau+h/2*b2)
			d1, d2 := slope(n1+h*c1, tau+h*c2)
			n1 += h / 6 * (a1 + 2*b1 + 2*c1 + d1)
			tau += h / 6 * (a2 + 2*b2 + 2*c2 + d2)
		}
		return [2]float64{n1, tau}, [2]float64{start, tau}
	}
	e0, _ := run(p, 0)
	e1v, _ := run(p, 1)
	tau := -e0[0] / (e1v[0] - e0[0])
	_, peak := run(p, tau)
	return math.Max(math.Abs(peak[0]), math.Abs(peak[1]))
}

func partRows() []row {
	rows := []row{
		{call: "link_shear(20 kN, 10 mm)", want: "r.A = 78.5398 mm^2; r.tau = 20 kN/(2*78.5398 mm^2)", tol: 1e-6, source: byHand},
		{call: "head_shear_rectangular(P=48 kN, w=20 mm, l=30 mm, t=12 mm)", want: "r.A = 1200 mm^2; r.tau = 40 MPa", source: byHand},
		{call: "head_shear_round(110 kN, 20 mm, 8 mm)", want: "r.tau = 219 MPa; r.A = 502.65 mm^2", tol: 1e-3, source: gere + "the punch of Example 1-6"},
		{call: "blanking_force(pi*20 mm, 8 mm, 218.84 MPa)", want: "r = 110 kN", tol: 1e-4, source: gere + "the punch of Example 1-6"},
		{call: "key_shear(T=500 N*m, d=50 mm, b=14 mm, h=9 mm, L=56 mm)", want: "r.tau = 25.5102 MPa; r.sigma_b = 79.3651 MPa", tol: 1e-5, source: byHand + ": a key 14 × 9 under 20 kN"},
		{call: "lug_tear_out(P=60 kN, a=30 mm, d_0=26 mm, t=20 mm)", want: "r.A = 1200 mm^2; r.tau = 50 MPa", source: byHand},
		{call: "lug_net_tension(P=60 kN, w=86 mm, d_0=26 mm, t=20 mm)", want: "r.A = 1200 mm^2; r.sigma = 50 MPa", source: byHand},
		{call: "thread_shear(P=40 kN, d=12 mm, p=1.75 mm, L_e=10 mm)", want: "r.A_ext = pi*10 mm*10.106 mm*(1/2 + (10.863 mm - 10.106 mm)/(sqrt(3)*1.75 mm)); r.tau_ext = 40 kN/(pi*10 mm*10.106 mm*0.75)", tol: 0.03,
			source: "ASME B1.1 Appendix B: π·L_e·D_1·(1/2 + (d_2 - D_1)/(√3·p)) of the basic profile, 2 to 3 % larger"},
		{call: "lap_joint_volkersen(P=5 kN, b=25 mm, l=1 mm, t_1=10 mm, t_2=10 mm, E_1=210 GPa, E_2=210 GPa, t_a=0.2 mm, G_a=10 MPa)",
			want: "r.k = 1; r.tau_max = 200 MPa; r.tau_avg = 200 MPa", tol: 1e-5, source: "stiff adherends and a short overlap: even shear"},
		{call: "lap_joint_volkersen(P=5 kN, b=25 mm, l=500 mm, t_1=2 mm, t_2=2 mm, E_1=70 GPa, E_2=70 GPa, t_a=0.2 mm, G_a=1 GPa)",
			want: "r.tau_max = 5 kN/25 mm/2*sqrt(2*1 GPa/(0.2 mm*70 GPa*2 mm))", source: "Volkersen, long overlap of like adherends: P/(2·b)·√(2·G_a/(t_a·E·t)), whatever the overlap"},
		{call: "lap_joint_volkersen(P=5 kN, b=25 mm, l=20 mm, t_1=2 mm, t_2=1000 m, E_1=70 GPa, E_2=70 GPa, t_a=0.2 mm, G_a=1 GPa)",
			want: "r.k = 20 mm*sqrt(1 GPa/(0.2 mm*70 GPa*2 mm))*cosh(20 mm*sqrt(1 GPa/(0.2 mm*70 GPa*2 mm)))/sinh(20 mm*sqrt(1 GPa/(0.2 mm*70 GPa*2 mm)))", tol: 1e-5,
			source: "Volkersen, one adherend rigid: λ·coth λ"},
	}
	for _, c := range [][4]float64{{60, 10, 20, 0}, {60, 12, 30, 2}} {
		rows = append(rows, row{
			call: fmt.Sprintf("pin_double_shear(P=%g kN, d=24 mm, t_1=%g mm, t_2=%g mm, g=%g mm)", c[0], c[1], c[2], c[3]),
			want: fmt.Sprintf("r.M = %.9g kN*mm; r.sigma = 32*%.9g kN*mm/(pi*(24 mm)^3); r.tau = 66.3146 MPa; r.sigma_b1 = %.9g MPa; r.sigma_b2 = %.9g MPa",
				pinMoment(c[0], c[1], c[2], c[3]), pinMoment(c[0], c[1], c[2], c[3]), 30e3/(24*c[1]), 60e3/(24*c[2])),
			tol: 1e-6, source: "bearing pressures integrated along the pin",
		})
	}
	for _, c := range [][9]float64{{5000, 25, 12.5, 1.6, 1.6, 70000, 70000, 0.2, 1000}, {5000, 25, 30, 1.6, 4, 70000, 210000, 0.2, 1200}, {8000, 40, 20, 6, 2, 210000, 70000, 0.5, 800}} {
		largest := shearLag(c[0], c[1], c[2], c[3], c[4], c[5], c[6], c[7], c[8])
		rows = append(rows, row{
			call: fmt.Sprintf("lap_joint_volkersen(%g N, %g mm, %g mm, %g mm, %g mm, %g MPa, %g MPa, %g mm, %g MPa)", c[0], c[1], c[2], c[3], c[4], c[5], c[6], c[7], c[8]),
			want: fmt.Sprintf("r.tau_max = %.9g MPa; r.k = %.9g", largest, largest/(c[0]/c[1]/c[2])), tol: 1e-6,
			source: "Volkersen's differential equations integrated by steps",
		})
	}
	return rows
}

// strips adds up a section that is symmetric about mid-height: area, second moment, first moment of half.
func strips(h float64, width func(y float64) float64) (a, i, q float64) {
	const n = 400000
	dy := h / n
	for k := range n {
		y := -h/2 + (float64(k)+0.5)*dy
		d := width(y) * dy
		a += d
		i += d * y * y
		if y > 0 {
			q += d * y
		}
	}
	return a, i, q
}

func sectionRows() []row {
	section := func(call, prefix string, h float64, width func(float64) float64, more string) row {
		a, i, q := strips(h, width)
		return row{
			call: call, tol: 2e-5, source: strip,
			want: fmt.Sprintf("r.A = %.9g mm^2; r.I%s = %.9g mm^4; r.W%s = %.9g mm^3; r.Q = %.9g mm^3%s", a, prefix, i, prefix, i/(h/2), q, more),
		}
	}
	chord := func(d float64) func(float64) float64 {
		return func(y float64) float64 { return 2 * math.Sqrt(max(0, d*d/4-y*y)) }
	}
	tube := func(y float64) float64 { return chord(114.3)(y) - chord(104.3)(y) }
	web := func(flange, web, tf, h float64) func(float64) float64 {
		return func(y float64) float64 {
			if math.Abs(y) > h/2-tf {
				return flange
			}
			return web
		}
	}
	// the flanges as seen from the side: the web is a thin strip in the middle
	sideways := func(y float64) float64 {
		if math.Abs(y) < 7.1/2 {
			return 300
		}
		return 2 * 10.7
	}
	_, iz, _ := strips(150, sideways)
	return []row{
		section("section_rectangle(b=100 mm, h=200 mm)", "_y", 200, func(float64) float64 { return 100 }, "; r.A_s = 5/6*20000 mm^2"),
		{call: "section_rectangle(b=100 mm, h=200 mm)", want: "r.J = 0.229*200 mm*(100 mm)^3", tol: 2e-3, source: timosh},
		{call: "section_rectangle(b=200 mm, h=100 mm)", want: "r.J = 0.229*200 mm*(100 mm)^3; r.I_y = 200 mm*(100 mm)^3/12", tol: 2e-3, source: timosh},
		{call: "section_rectangle(b=40 mm, h=60 mm)", want: "r.J = 30 mm*(20 mm)^3*(16/3 - 3.36*20/30*(1 - (20/30)^4/12))", tol: 0.005, source: "Roark, Table 10.7: a·b³·(16/3 - 3.36·b/a·(1 - b⁴/(12·a⁴))) of half sides"},
		section("section_circle(50 mm)", "", 50, chord(50), "; r.A_s = 0.9*pi*(25 mm)^2; r.J = pi*(25 mm)^4/2"),
		section("section_tube(D=114.3 mm, t=5 mm)", "", 114.3, tube, ""),
		{call: "section_tube(D=114.3 mm, t=5 mm)", want: "r.A = 17.2 cm^2; r.I = 257 cm^4; r.W = 45.0 cm^3; r.J = 514 cm^4", tol: 2e-3, source: en10210},
		section("section_i(h=300 mm, b=150 mm, t_w=7.1 mm, t_f=10.7 mm)", "_y", 300, web(150, 7.1, 10.7, 300),
			fmt.Sprintf("; r.I_z = %.9g mm^4; r.A_v = 278.6 mm*7.1 mm; r.J = (2*150*10.7^3 + 278.6*7.1^3)/3*1 mm^4", iz)),
		{call: "section_i(h=300 mm, b=150 mm, t_w=7.1 mm, t_f=10.7 mm)", want: "r.A = 53.8 cm^2; r.I_y = 8356 cm^4; r.I_z = 604 cm^4", tol: 0.05, source: "IPE 300 of EN 10365, from memory, whose fillets add 4 %"},
		section("section_box(h=200 mm, b=120 mm, t=8 mm)", "_y", 200, web(120, 16, 8, 200), "; r.J = 4*(112 mm*192 mm)^2*8 mm/(608 mm)"),
		{call: "section_box(h=100 mm, b=100 mm, t=5 mm)", want: "r.A = 18.7 cm^2; r.I_y = 279 cm^4; r.J = 439 cm^4", tol: 0.03, source: en10210 + ", whose corners are round"},
		{call: "beam_shear(V=60 kN, Q=500000 mm^3, I=66666666.7 mm^4, b=100 mm)", want: "r = 3/2*60 kN/(20000 mm^2)", tol: 1e-6, source: "parabola over a rectangle of 100 × 200"},
		{call: "beam_shear_rectangle(60 kN, 100 mm, 200 mm)", want: "r.tau_avg = 3 MPa; r.tau_max = 4.5 MPa", source: "EN 1995-1-1 and all textbooks: 1.5·V/A"},
		{call: "beam_shear_circle(60 kN, 50 mm)", want: "r.tau_avg = 30.5577 MPa; r.tau_max = 60 kN*((50 mm)^3/12)/(pi*(50 mm)^4/64*50 mm)", tol: 1e-5, source: "V·Q/(I·b)"},
		{call: "shear_flow(V=10.5 kN, Q=864e3 mm^3, I=264.2e6 mm^4)", want: "r = 34.3 N/mm", tol: 2e-3, source: gere + "the box beam of Example 5-16"},
		{call: "fastener_pitch(F=800 N, n=2, q=34.3 N/mm)", want: "r = 46.6 mm", tol: 2e-3, source: gere + "the box beam of Example 5-16"},
	}
}

func torsionRows() []row {
	rows := []row{
		{call: "torsion_circular(T=250 lbf*ft, D=1.5 in, L=54 in, G=11.5e6 psi)", want: "r.tau_max = 4530 psi; r.theta = 0.02834; r.J = 0.4970 in^4", tol: 1e-3, source: gere + "Example 3-1"},
		{call: "torsion_circular(T=1 kN*m, D=80 mm, L=2 m, G=80 GPa, d=60 mm)", want: "r.J = pi/2*((40 mm)^4 - (30 mm)^4); r.tau_max = 14.5513 MPa; r.theta = 0.52108 deg", tol: 1e-4, source: byHand},
		{call: "torsion_thin_closed(T=1 kN*m, A_m=pi*(50 mm)^2, t=0.01 mm, p=pi*100 mm, L=1 m, G=80 GPa)",
			want: "r.tau = 1 kN*m*100.01 mm/2/(pi/32*((100.01 mm)^4 - (99.99 mm)^4)); r.J = pi/32*((100.01 mm)^4 - (99.99 mm)^4); r.theta = 1 kN*m*1 m/(80 GPa*(pi/32*((100.01 mm)^4 - (99.99 mm)^4))); r.q = 1 kN*m/(2*pi*(50 mm)^2)",
			tol:  2e-4, source: "the exact tube as t → 0"},
		{setup: "```schedule p\nmark | b [mm] | t [mm]\nA | 1000 | 1\n```", call: "torsion_thin_open(10 N*m, p.b, p.t)", want: "r.J = 1000 mm*(1 mm)^3/3; r.tau_max = 10 N*m/(1000 mm*(1 mm)^2/3)", tol: 1e-9, source: timosh + ": 1/3 for a thin strip"},
		{setup: "```schedule p\nmark | b [mm] | t [mm]\ntop | 150 | 10.7\nweb | 278.6 | 7.1\nbottom | 150 | 10.7\n```", call: "torsion_thin_open(1 kN*m, p.b, p.t)",
			want: "r.J = 15.57 cm^4; r.tau_max = 1 kN*m*10.7 mm/15.57 cm^4", tol: 2e-3, source: byHand + ": the plates of an IPE 300"},
		{call: "shaft_torque(1 kW, 1 rpm)", want: "r = 9549.3 N*m", tol: 1e-5, source: "T = 9549·P/n in N·m, kW and rpm, common practice"},
		{call: "shaft_torque(1 hp, 1 rpm)", want: "r = 63025 lbf*in", tol: 1e-5, source: "T = 63 025·hp/n in lbf·in and rpm, common practice"},
		{call: "shaft_torque(7.5 kW, 24.1667 Hz)", want: "r = 49.4 N*m", tol: 1e-3, source: byHand + ": 1450 rpm"},
	}
	for _, c := range [][3]float64{ // a/b, k_1, k_2
		{1, 0.1406, 0.208}, {1.2, 0.166, 0.219}, {1.5, 0.196, 0.231}, {2, 0.229, 0.246}, {2.5, 0.249, 0.258}, {3, 0.263, 0.267},
		{4, 0.281, 0.282}, {5, 0.291, 0.291}, {10, 0.312, 0.312}, {1e6, 1.0 / 3, 1.0 / 3},
	} {
		rows = append(rows, row{
			call: fmt.Sprintf("torsion_rectangle(T=1 kN*m, a=%g mm, b=20 mm, L=1 m, G=80 GPa)", 20*c[0]),
			want: fmt.Sprintf("r.k_1 = %[1]g; r.k_2 = %[2]g; r.J = %[1]g*%[3]g mm*(20 mm)^3; r.tau_max = 1 kN*m/(%[2]g*%[3]g mm*(20 mm)^2); r.theta = 1 kN*m*1 m/(80 GPa*%[1]g*%[3]g mm*(20 mm)^3)", c[1], c[2], 20*c[0]),
			tol:  3e-3, source: timosh,
		})
	}
	for _, c := range [][2]float64{{4, 1.404}, {6, 1.2525}, {8, 1.184}, {10, 1.145}, {12, 1.1194}} {
		d := 40 / c[0]
		rows = append(rows, row{
			call: fmt.Sprintf("helical_spring(F=200 N, D=40 mm, d=%.12g mm, G=80 GPa, n_a=8)", d),
			want: fmt.Sprintf("r.K_w = %[1]g; r.tau_max = %[1]g*8*200 N*40 mm/(pi*(%.12[2]g mm)^3); r.k*r.delta = 200 N; 200 N * r.delta/2 = (200 N*20 mm)^2*(pi*40 mm*8)/(2*80 GPa * pi/32*(%.12[2]g mm)^4)", c[1], d),
			tol:  6e-4, source: wahl + "; deflection by the work of torsion along the wire",
		})
	}
	return rows
}

// turned returns the tensor on axes turned by an angle.
func turned(xx, yy, xy, angle float64) *mat.Dense {
	c, s := math.Cos(angle), math.Sin(angle)
	r := mat.NewDense(2, 2, []float64{c, s, -s, c})
	var out mat.Dense
	out.Product(r, mat.NewDense(2, 2, []float64{xx, xy, xy, yy}), r.T())
	return &out
}

// eigen returns the eigenvalues of a plane tensor, the larger first.
func eigen(xx, yy, xy float64) (float64, float64) {
	var e mat.EigenSym
	e.Factorize(mat.NewSymDense(2, []float64{xx, xy, xy, yy}), false)
	v := e.Values(nil)
	return v[1], v[0]
}

func stateRows() []row {
	rows := []row{
		{call: "plane_stress(12300 psi, -4200 psi, -4700 psi)", want: "r.sigma_1 = 13540 psi; r.sigma_2 = -5440 psi; r.tau_max = 9490 psi; r.theta_p = 165.2 deg - 180 deg; r.tau_abs = 9490 psi; r.sigma_tresca = 18980 psi", tol: 3e-3, source: gere + "Example 7-3"},
		{call: "plane_stress(0 MPa, 0 MPa, 100 MPa)", want: "r.sigma_v = 173.205 MPa; r.sigma_tresca = 200 MPa; r.theta_p = 45 deg", tol: 1e-5, source: "von Mises √3·τ, Tresca 2·τ"},
		{call: "plane_stress(100 MPa, 60 MPa, 0 MPa)", want: "r.tau_max = 20 MPa; r.tau_abs = 50 MPa; r.theta_p = 0; r.sigma_tresca = 100 MPa", source: "the largest circle goes through the stress-free direction"},
		{call: "plane_stress(-100 MPa, -60 MPa, 0 MPa)", want: "r.tau_abs = 50 MPa; r.theta_p = 90 deg; r.sigma_1 = -60 MPa", source: "sigma_1 lies along y"},
		{setup: "t = 0 MPa", call: "plane_stress(10 MPa, 50 MPa, -t)", want: "r.theta_p = 90 deg; r.sigma_1 = 50 MPa", source: "the range is (-90°, 90°]"},
		{call: "plane_stress(10 MPa, 50 MPa, -1e-15 MPa)", want: "r.theta_p = 90 deg", source: "the range is (-90°, 90°]"},
		{call: "plane_stress(0 MPa, 0 MPa, 0 MPa)", want: "r.sigma_1 = 0; r.sigma_v = 0; r.theta_p = 0", source: "no stress"},
		{call: "stress_rotate(16000 psi, 6000 psi, 4000 psi, 45 deg)", want: "r.sigma_n = 15000 psi; r.tau_nt = -5000 psi; r.sigma_t = 7000 psi", tol: 1e-9, source: gere + "Example 7-1"},
		{call: "stress_3d(80 MPa, 30 MPa, 0 MPa, 40 MPa, 0 MPa, 0 MPa)", want: "r.sigma_1 = 102.170 MPa; r.sigma_2 = 7.8301 MPa; r.sigma_3 = 0; r.sigma_v = 98.4886 MPa; r.tau_max = 51.085 MPa", tol: 1e-5, source: byHand + ": plane stress"},
		{call: "stress_3d(0 MPa, 0 MPa, 0 MPa, 0 MPa, 0 MPa, 0 MPa)", want: "r.sigma_1 = 0; r.sigma_v = 0", source: "no stress"},
		{call: "stress_3d(-50 MPa, -50 MPa, -50 MPa, 0 MPa, 0 MPa, 0 MPa)", want: "r.sigma_1 = -50 MPa; r.sigma_3 = -50 MPa; r.tau_max = 0", source: "hydrostatic pressure"},
		{call: "strain_from_stress(200 MPa, 0 MPa, 0 MPa, 200 GPa, 0.3)", want: "r.epsilon_x = 1000 ustrain; r.epsilon_y = -300 ustrain; r.epsilon_z = -300 ustrain; r.gamma_xy = 0", source: "a bar in tension"},
	}
	for _, c := range [][3]float64{{120, -40, 35}, {-80, -20, -60}, {10, 200, 90}, {50, 50, -25}} {
		s1, s2 := eigen(c[0], c[1], c[2])
		for _, angle := range []float64{30, -75, 110} {
			m := turned(c[0], c[1], c[2], angle*math.Pi/180)
			rows = append(rows, row{
				call:   fmt.Sprintf("stress_rotate(%g MPa, %g MPa, %g MPa, %g deg)", c[0], c[1], c[2], angle),
				want:   fmt.Sprintf("r.sigma_n = %.12g MPa; r.sigma_t = %.12g MPa; r.tau_nt = %.12g MPa", m.At(0, 0), m.At(1, 1), m.At(0, 1)),
				source: rotation, tol: 1e-9,
			})
		}
		rows = append(rows, row{
			call:   fmt.Sprintf("plane_stress(%g MPa, %g MPa, %g MPa)", c[0], c[1], c[2]),
			want:   fmt.Sprintf("r.sigma_1 = %.12g MPa; r.sigma_2 = %.12g MPa; r.tau_max = %.12g MPa; r.sigma_v = sqrt((%.12[1]g MPa)^2 - %.12[1]g MPa*(%.12[2]g MPa) + (%.12[2]g MPa)^2)", s1, s2, (s1-s2)/2),
			source: "eigenvalues of the tensor",
		})
	}
	return slices.Concat(rows, spaceRows(), hookeRows(), rosetteRows())
}

// spaceRows are states of stress whose principal stresses are chosen, turned about three axes.
func spaceRows() []row {
	var rows []row
	for _, p := range [][3]float64{{150, 40, -70}, {100, 100, -50}, {-10, -20, -300}} {
		m := mat.NewDense(3, 3, []float64{p[0], 0, 0, 0, p[1], 0, 0, 0, p[2]})
		for axis, angle := range []float64{0.4, -1.1, 0.7} {
			c, s := math.Cos(angle), math.Sin(angle)
			r := mat.NewDense(3, 3, []float64{1, 0, 0, 0, 1, 0, 0, 0, 1})
			i, j := (axis+1)%3, (axis+2)%3
			r.Set(i, i, c)
			r.Set(j, j, c)
			r.Set(i, j, s)
			r.Set(j, i, -s)
			var out mat.Dense
			out.Product(r, m, r.T())
			m = mat.DenseCopyOf(&out)
		}
		rows = append(rows, row{
			call: fmt.Sprintf("stress_3d(%.15g MPa, %.15g MPa, %.15g MPa, %.15g MPa, %.15g MPa, %.15g MPa)", m.At(0, 0), m.At(1, 1), m.At(2, 2), m.At(0, 1), m.At(1, 2), m.At(2, 0)),
			want: fmt.Sprintf("r.sigma_1 = %g MPa; r.sigma_2 = %g MPa; r.sigma_3 = %g MPa; r.tau_max = %g MPa; r.sigma_v = %.12g MPa", p[0], p[1], p[2], (p[0]-p[2])/2,
				math.Sqrt((math.Pow(p[0]-p[1], 2)+math.Pow(p[1]-p[2], 2)+math.Pow(p[2]-p[0], 2))/2)),
			source: rotation,
		})
	}
	return rows
}

// hookeRows solve the compliance of plane stress as a matrix.
func hookeRows() []row {
	var rows []row
	for _, c := range [][5]float64{{120, -40, 35, 210000, 0.3}, {-8, 3, 2, 12000, 0.45}} {
		e, nu := c[3], c[4]
		compliance := mat.NewDense(3, 3, []float64{1 / e, -nu / e, 0, -nu / e, 1 / e, 0, 0, 0, 2 * (1 + nu) / e})
		var strain, back mat.VecDense
		strain.MulVec(compliance, mat.NewVecDense(3, c[:3]))
		if err := back.SolveVec(compliance, &strain); err != nil {
			panic(err)
		}
		rows = append(rows,
			row{call: fmt.Sprintf("strain_from_stress(%g MPa, %g MPa, %g MPa, %g MPa, %g)", c[0], c[1], c[2], e, nu),
				want:   fmt.Sprintf("r.epsilon_x = %.15g; r.epsilon_y = %.15g; r.gamma_xy = %.15g; r.epsilon_z = %.15g", strain.AtVec(0), strain.AtVec(1), strain.AtVec(2), -nu/e*(c[0]+c[1])),
				source: "compliance as a matrix"},
			row{call: fmt.Sprintf("stress_from_strain(%.15g, %.15g, %.15g, %g MPa, %g)", strain.AtVec(0), strain.AtVec(1), strain.AtVec(2), e, nu),
				want:   fmt.Sprintf("r.sigma_x = %.15g MPa; r.sigma_y = %.15g MPa; r.tau_xy = %.15g MPa", back.AtVec(0), back.AtVec(1), back.AtVec(2)),
				source: "compliance as a matrix, solved"})
	}
	return rows
}

// rosetteRows read the gauges off a strain tensor that is turned to each of them.
func rosetteRows() []row {
	var rows []row
	for _, c := range [][3]float64{{340e-6, -110e-6, 180e-6}, {-50e-6, 400e-6, -90e-6}, {-50e-6, 400e-6, 90e-6}} { // epsilon_x, epsilon_y, gamma_xy
		e1, e2 := eigen(c[0], c[1], c[2]/2)
		var vec mat.EigenSym
		vec.Factorize(mat.NewSymDense(2, []float64{c[0], c[2] / 2, c[2] / 2, c[1]}), true)
		var v mat.Dense
		vec.VectorsTo(&v)
		angle := math.Atan(v.At(1, 1)/v.At(0, 1)) * 180 / math.Pi // of the larger
		gauge := func(deg float64) float64 { return turned(c[0], c[1], c[2]/2, deg*math.Pi/180).At(0, 0) }
		want := fmt.Sprintf("r.epsilon_x = %.12g; r.epsilon_y = %.12g; r.gamma_xy = %.12g; r.epsilon_1 = %.12g; r.epsilon_2 = %.12g; r.gamma_max = %.12g; r.theta_p = %.12g deg", c[0], c[1], c[2], e1, e2, e1-e2, angle)
		rows = append(rows,
			row{call: fmt.Sprintf("rosette_45(%.15g, %.15g, %.15g)", gauge(0), gauge(45), gauge(90)), want: want, source: rotation},
			row{call: fmt.Sprintf("rosette_60(%.15g, %.15g, %.15g)", gauge(0), gauge(60), gauge(120)), want: want, source: rotation})
	}
	return rows
}
