package library_test

import (
	"fmt"
	"math"
)

func concreteRows() []row {
	rows := []row{
		{call: "punching_ec2(V=500 kN, d=200 mm, c_1=300 mm, c_2=300 mm, f_ck=30 MPa, rho_l=0.01)",
			want:   "r.u_1 = 1200 mm + pi*800 mm; r.v_Ed = 1.15*500 kN/((1200 mm + pi*800 mm)*200 mm); r.u = r.v_Ed/r.v_Rd_c; r.v_Ed_0 = 1.15*500 kN/(1200 mm*200 mm); r.v_Rd_max = 0.4*0.528*20 MPa",
			source: byHand + ": EN 1992-1-1, 6.4"},
		{call: "punching_ec2(500 kN, 200 mm, 300 mm, 300 mm, 30 MPa, 0.035)", want: "r.v_Rd_c = 0.94 MPa", tol: 5e-3, source: "v_Rd,c at 2 %, which is as much as counts: the table below"},
		{call: "two_way_shear_aci(c_1=16 in, c_2=16 in, d=6 in, f_c=4000 psi)", want: "r.b_0 = 88 in; r.v_c = 253 psi; r.V_c = 133.6 kip", tol: 1e-3, source: byHand + ": 4·√4000 = 253 psi"},
		{call: "two_way_shear_aci(c_1=400 mm, c_2=400 mm, d=150 mm, f_c=28 MPa)", want: "r.v_c = 0.33*sqrt(28)*1 MPa", tol: 0.01, source: "ACI 318M-14, Table 22.6.5.2: 0.33·λ·√f_c'"},
		{call: "two_way_shear_aci(c_1=12 in, c_2=48 in, d=12 in, f_c=4000 psi)", want: "r.v_c = 3*sqrt(4000)*1 psi; r.V_c = 3*sqrt(4000)*1 psi*168 in*12 in", source: byHand + ": the column's sides, 2 + 4/4, govern"},
		{call: "two_way_shear_aci(c_1=60 in, c_2=60 in, d=6 in, f_c=4000 psi)", want: "r.v_c = (2 + 40*6/264)*sqrt(4000)*1 psi", source: byHand + ": the length of the section, 2 + 40·6/264, governs"},
		{call: "two_way_shear_aci(c_1=16 in, c_2=16 in, d=6 in, f_c=14400 psi, lambda=0.75)", want: "r.v_c = 300 psi", source: byHand + ": the root is held at 100 psi"},
		{call: "two_way_shear_aci(c_1=16 in, c_2=16 in, d=3 in, f_c=3600 psi, alpha_s=20)", want: "r.v_c = (2 + 60/76)*60*1 psi", source: byHand},
	}
	// v_Rd,c in N/mm² of C30 by reinforcement and depth
	for _, c := range []struct{ rho, d, v float64 }{{0.25, 200, 0.54}, {0.5, 200, 0.59}, {0.75, 200, 0.68}, {1, 200, 0.75}, {1.25, 200, 0.80}, {1.5, 200, 0.85}, {2, 200, 0.94}, {1, 150, 0.75}, {1, 300, 0.68}, {1, 400, 0.64}, {1, 600, 0.59}} {
		rows = append(rows, row{
			call: fmt.Sprintf("punching_ec2(500 kN, %g mm, 300 mm, 300 mm, 30 MPa, %g)", c.d, c.rho/100),
			want: fmt.Sprintf("r.v_Rd_c = %g MPa", c.v), tol: 0.009, source: "Concise Eurocode 2, table of v_Rd,c, from memory",
		})
	}
	return rows
}

func soilRows() []row {
	rows := []row{
		{call: "mohr_coulomb(c=20 kPa, sigma=0 kPa, phi=30 deg)", want: "r = 20 kPa", source: "cohesion alone"},
		{call: "mohr_coulomb(c=50 kPa, sigma=100 kPa, phi=0 deg)", want: "r = 50 kPa", source: "undrained"},
		{call: "mohr_coulomb(c=0 kPa, sigma=100 kPa, phi=30 deg)", want: "r = 57.735 kPa", tol: 1e-6, source: byHand},
	}
	// the point of contact of the circle at failure lies on the line: sigma_1 = sigma_3·N + 2·c·√N, N = tan²(45° + phi/2)
	for _, c := range [][3]float64{{10, 28, 50}, {25, 35, 120}} {
		phi := c[1] * math.Pi / 180
		n := math.Pow(math.Tan(math.Pi/4+phi/2), 2)
		s1 := c[2]*n + 2*c[0]*math.Sqrt(n)
		radius, centre := (s1-c[2])/2, (s1+c[2])/2
		rows = append(rows, row{
			call: fmt.Sprintf("mohr_coulomb(%g kPa, %.15g kPa, %g deg)", c[0], centre-radius*math.Sin(phi), c[1]),
			want: fmt.Sprintf("r = %.12g kPa", radius*math.Cos(phi)), source: "Rankine: the circle of the principal stresses at failure touches the line",
		})
	}
	return rows
}
