package library_test

import (
	"fmt"
	"regexp"
	"slices"
	"strings"
	"testing"

	"gusset/notebook/diag"
	"gusset/notebook/syntax"
)

// limits holds a helper's `needs` lines to what they say: for each, in order, arguments just inside
// and just outside, `d=8 mm | d=8.00001 mm`, several by `;`. They replace those of a sound call.
type limits struct {
	helper string
	setup  string
	args   string // of a sound call, `name=value`
	bounds []string
}

// positive is a limit above 0 on some arguments: a thousandth of the sound value, and nothing.
func positive(names ...string) string {
	var b []string
	for _, n := range names {
		b = append(b, fmt.Sprintf("%[1]s=0.001*(@%[1]s) | %[1]s=0*(@%[1]s)", n))
	}
	return strings.Join(b, "; ")
}

const factorBound = "%[1]s=1 | %[1]s=0.999999"

func atLeastOne(names ...string) string {
	var b []string
	for _, n := range names {
		b = append(b, fmt.Sprintf(factorBound, n))
	}
	return strings.Join(b, "; ")
}

const (
	aModulus  = "nu=-0.999999 | nu=-1; nu=0.499999 | nu=0.5"
	aModulus5 = "nu=-0.999999 | nu=-1; nu=0.5 | nu=0.500001"
	zeroOrOne = "%[1]s=0 | %[1]s=0.001; %[1]s=1 | %[1]s=1.001; %[1]s=1 | %[1]s=-1"
	phiBound  = "phi=0.001 | phi=0; phi=1 | phi=1.000001"
	ropeBound = "rope=0 | rope=-0.000001; rope=1 | rope=1.000001"
	toGrain   = "%[1]s=0 deg | %[1]s=-0.0001 deg; %[1]s=90 deg | %[1]s=90.0001 deg"

	twoStrips = "```schedule p\nmark | b [mm] | t [mm]\nA | 100 | 10\nB | 300 | 10\n```\n```schedule twins\nmark | t [mm]\nA | 10\nB | 10\n```\n```schedule thick\nmark | b [mm] | t [mm]\nA | 99.999 | 10\n```\n```schedule none\nmark | b [mm] | t [mm]\nA | 10 | 0\n```\n```schedule fine\nmark | b [mm] | t [mm]\nA | 10 | 1e-6\n```"
	fourBolts = "```schedule rows\nmark | y [mm]\nA | 0\nB | 0\n```\n```schedule b\nmark | x [mm] | y [mm]\nA | 0 | 0\nB | 100 | 0\n```\n```schedule close\nmark | x [mm] | y [mm]\nA | 0 | 0\nB | 0 | 0.001\n```\n```schedule same\nmark | x [mm] | y [mm]\nA | 5 | 7\nB | 5 | 7\n```"
	twoRuns   = "```schedule ends\nmark | x [mm]\nA | 0\nB | 50\n```\n```schedule w\nmark | x1 [mm] | y1 [mm] | x2 [mm] | y2 [mm]\nA | 0 | 0 | 0 | 100\nB | 50 | 0 | 50 | 0.001\n```\n```schedule v\nmark | x1 [mm] | y1 [mm] | x2 [mm] | y2 [mm]\nA | 0 | 0 | 0 | 100\nB | 50 | 0 | 50 | 0\n```"
)

func of(format, name string) string { return fmt.Sprintf(format, name) }

// A value in the middle of `0 or 1` has both sides outside.
var allLimits = slices.Concat(elasticLimits, steelLimits, otherLimits)

var elasticLimits = []limits{
	{"axial_stress", "", "N=1 kN, A=100 mm^2", []string{positive("A")}},
	{"axial_strain", "", "delta=1 mm, L=1 m", []string{positive("L")}},
	{"axial_elongation", "", "N=1 kN, L=1 m, A=100 mm^2, E=210 GPa", []string{positive("L", "A", "E")}},
	{"direct_shear", "", "V=1 kN, A=100 mm^2, n=2", []string{positive("A"), atLeastOne("n")}},
	{"shear_strain", "", "delta=1 mm, h=20 mm", []string{"h=10 mm | h=0*(@h)", "delta=17.38 mm, h=100 mm | delta=17.4 mm, h=100 mm"}},
	{"shear_modulus", "", "E=210 GPa, nu=0.3", []string{positive("E"), aModulus}},
	{"poisson_ratio", "", "E=210 GPa, G=80 GPa", []string{"E=170 GPa | E=0*(@E)" + "; " + "G=100 GPa | G=0*(@G)", "G=70.0001 GPa | G=70 GPa; E=0.001 GPa | E=1e-8 GPa"}},
	{"bulk_modulus", "", "E=210 GPa, nu=0.3", []string{positive("E"), aModulus}},
	{"shear_yield_mises", "", "f_y=355 MPa", []string{positive("f_y")}},
	{"shear_yield_tresca", "", "f_y=355 MPa", []string{positive("f_y")}},
	{"shear_response", "", "gamma=0.001, G=80 GPa, tau_y=200 MPa", []string{positive("G", "tau_y")}},
	{"shear_deflection", "", "V=1 kN, L=1 m, G=80 GPa, A_s=100 mm^2", []string{positive("L", "G", "A_s")}},
	{"thermal_stress", "", "alpha=12e-6 1/K, dT=30 K, E=210 GPa", []string{positive("E")}},
	{"link_shear", "", "P=1 kN, d=10 mm", []string{positive("d")}},
	{"head_shear_rectangular", "", "P=1 kN, w=10 mm, l=10 mm, t=10 mm", []string{positive("w", "l", "t")}},
	{"head_shear_round", "", "P=1 kN, d=10 mm, t=10 mm", []string{positive("d", "t")}},
	{"blanking_force", "", "L=1 m, t=1 mm, tau_u=300 MPa", []string{positive("L", "t", "tau_u")}},
	{"key_shear", "", "T=1 kN*m, d=50 mm, b=14 mm, h=9 mm, L=50 mm", []string{"d=14.1 mm | d=0*(@d); " + positive("b", "h", "L"), "b=49.999 mm | b=50 mm"}},
	{"pin_double_shear", "", "P=1 kN, d=20 mm, t_1=10 mm, t_2=20 mm, g=1 mm", []string{positive("d", "t_1", "t_2"), "g=0 mm | g=-0.001 mm"}},
	{"lug_tear_out", "", "P=1 kN, a=20 mm, d_0=20 mm, t=10 mm", []string{positive("a", "d_0", "t")}},
	{"lug_net_tension", "", "P=1 kN, w=50 mm, d_0=20 mm, t=10 mm", []string{positive("d_0", "t"), "w=20.0001 mm | w=20 mm"}},
	{"lap_joint_volkersen", "", "P=1 kN, b=25 mm, l=12 mm, t_1=2 mm, t_2=2 mm, E_1=70 GPa, E_2=70 GPa, t_a=0.2 mm, G_a=1 GPa", []string{positive("b", "l", "t_1", "t_2", "t_a", "E_1", "E_2", "G_a")}},
	{"thread_shear", "", "P=1 kN, d=12 mm, p=1.75 mm, L_e=10 mm", []string{positive("p", "L_e"), "d=1.22687 mm, p=1 mm | d=1.226869 mm, p=1 mm"}},
	{"section_rectangle", "", "b=100 mm, h=200 mm", []string{positive("b", "h")}},
	{"section_circle", "", "d=10 mm", []string{positive("d")}},
	{"section_tube", "", "D=100 mm, t=5 mm", []string{positive("t"), "t=50 mm | t=50.0001 mm"}},
	{"section_i", "", "h=300 mm, b=150 mm, t_w=7 mm, t_f=11 mm", []string{positive("t_w", "t_f"), "h=22.0001 mm | h=22 mm", "b=7 mm | b=6.9999 mm"}},
	{"section_box", "", "h=200 mm, b=100 mm, t=5 mm", []string{positive("t"), "t=49.999 mm | t=50 mm", "t=10 mm | t=10.0001 mm"}},
	{"beam_shear", "", "V=1 kN, Q=100 mm^3, I=100 mm^4, b=10 mm", []string{positive("I", "b")}},
	{"beam_shear_rectangle", "", "V=1 kN, b=10 mm, h=10 mm", []string{positive("b", "h")}},
	{"beam_shear_circle", "", "V=1 kN, d=10 mm", []string{positive("d")}},
	{"shear_flow", "", "V=1 kN, Q=100 mm^3, I=100 mm^4", []string{positive("I")}},
	{"fastener_pitch", "", "F=1 kN, n=2, q=10 N/mm", []string{positive("F"), atLeastOne("n"), positive("q")}},
	{"torsion_circular", "", "T=1 kN*m, D=50 mm, L=1 m, G=80 GPa, d=20 mm", []string{positive("L", "G"), "d=0 mm | d=-0.0001 mm; d=49.999 mm | d=50 mm"}},
	{"torsion_rectangle", "", "T=1 kN*m, a=50 mm, b=20 mm, L=1 m, G=80 GPa", []string{positive("b"), "a=20 mm | a=19.9999 mm", positive("L", "G")}},
	{"torsion_thin_closed", "", "T=1 kN*m, A_m=10000 mm^2, t=5 mm, p=400 mm, L=1 m, G=80 GPa",
		[]string{positive("A_m") + "; " + "t=0.001 mm | t=0*(@t); p=0.4 mm | p=0*(@p); L=1 mm | L=0*(@L)" + "; " + positive("G"), "t=10 mm | t=10.0001 mm"}},
	{"torsion_thin_open", twoStrips, "T=1 kN*m, b=p.b, t=p.t", []string{"T=1 kN*m | b=p.b, t=twins.t",
		"b=fine.b, t=fine.t | b=none.b, t=none.t", "T=1 kN*m | b=thick.b, t=thick.t"}},
	{"shaft_torque", "", "P=1 kW, n=1000 rpm", []string{positive("n")}},
	{"helical_spring", "", "F=1 kN, D=40 mm, d=5 mm, G=80 GPa, n_a=8", []string{positive("d"), "D=5.0001 mm | D=5 mm", positive("G"), positive("n_a"), "D=20 mm | D=19.9999 mm; D=60 mm | D=60.0001 mm"}},
	{"strain_from_stress", "", "sigma_x=1 MPa, sigma_y=1 MPa, tau_xy=1 MPa, E=210 GPa, nu=0.3", []string{positive("E"), aModulus5}},
	{"stress_from_strain", "", "epsilon_x=0.001, epsilon_y=0.001, gamma_xy=0.001, E=210 GPa, nu=0.3", []string{positive("E"), aModulus5}},
}

var steelLimits = []limits{
	{"bolt_group_elastic", fourBolts, "x=b.x, y=b.y, P_x=1 kN, P_y=1 kN, M=1 kN*m", []string{"M=1 kN*m | y=rows.y", "x=close.x, y=close.y | x=same.x, y=same.y"}},
	{"bolt_group_ic", fourBolts, "x=b.x, y=b.y, e=50 mm, theta=0 deg, R_u=1 kN", []string{"e=50 mm | y=rows.y", "x=close.x, y=close.y | x=same.x, y=same.y; x=same.x, y=same.y, e=0 mm | x=same.x, y=same.y", positive("R_u")}},
	{"weld_group_elastic", twoRuns, "x1=w.x1, y1=w.y1, x2=w.x2, y2=w.y2, P_x=1 kN, P_y=1 kN, M=1 kN*m", []string{"P_x=1 kN | x2=ends.x", "P_x=1 kN | x1=v.x1, y1=v.y1, x2=v.x2, y2=v.y2"}},
	{"bolt_shear_ec3", "", "A=245 mm^2, f_ub=800 MPa, alpha_v=0.6, n=2, gamma_M2=1.25",
		[]string{positive("A") + "; " + atLeastOne("n", "gamma_M2"), "f_ub=400 MPa | f_ub=399.999 MPa; f_ub=1000 MPa | f_ub=1000.001 MPa", "alpha_v=0.5 | alpha_v=0.499999; alpha_v=0.6 | alpha_v=0.600001"}},
	{"bolt_bearing_ec3", "", "d=20 mm, d_0=22 mm, t=10 mm, e_1=40 mm, e_2=40 mm, f_u=410 MPa, f_ub=800 MPa, gamma_M2=1.25, p_1=60 mm, p_2=60 mm",
		[]string{positive("d", "t", "f_u", "f_ub") + "; " + atLeastOne("gamma_M2"), "d_0=20 mm | d_0=19.9999 mm",
			"e_1=26.4 mm | e_1=26.3999 mm", "e_2=26.4 mm | e_2=26.3999 mm", "p_1=48.4 mm | p_1=48.3999 mm; p_1=0 mm | p_1=0.0001 mm", "p_2=52.8 mm | p_2=52.7999 mm; p_2=0 mm | p_2=0.0001 mm"}},
	{"bolt_tension_shear_ec3", "", "F_v=1 kN, F_v_Rd=10 kN, F_t=1 kN, F_t_Rd=10 kN", []string{"F_v=0 kN | F_v=-0.0001 kN; " + positive("F_v_Rd", "F_t_Rd"), "F_t=0 kN | F_t=-0.0001 kN"}},
	{"block_tearing_ec3", "", "A_nt=400 mm^2, A_nv=400 mm^2, f_u=410 MPa, f_y=275 MPa, gamma_M2=1.25, gamma_M0=1",
		[]string{"A_nt=0 mm^2 | A_nt=-0.001 mm^2; A_nv=0 mm^2 | A_nv=-0.001 mm^2; " + positive("f_y") + "; " + atLeastOne("gamma_M2", "gamma_M0"), "f_u=275 MPa | f_u=274.999 MPa"}},
	{"pin_ec3", "", "F=100 kN, d=50 mm, a=10 mm, b=20 mm, c=1 mm, f_up=600 MPa, f_yp=355 MPa, f_y=275 MPa, gamma_M0=1, gamma_M2=1.25",
		[]string{"F=0 kN | F=-0.001 kN", positive("d", "a", "b", "f_yp", "f_y") + "; c=0 mm | c=-0.0001 mm; " + atLeastOne("gamma_M0", "gamma_M2"), "f_up=355 MPa | f_up=354.999 MPa"}},
	{"pin_plate_ec3", "", "F=100 kN, t=20 mm, d_0=52 mm, f_y=275 MPa, gamma_M0=1", []string{"F=0 kN | F=-0.001 kN", positive("t", "d_0", "f_y") + "; " + atLeastOne("gamma_M0")}},
	{"bolt_shear_aisc", "", "A_b=1 in^2, F_nv=54 ksi, n=2, phi=0.75", []string{positive("A_b", "F_nv") + "; " + atLeastOne("n") + "; " + phiBound}},
	{"bolt_bearing_aisc", "", "d=1 in, t=1 in, l_c=1 in, F_u=58 ksi, phi=0.75", []string{positive("d", "t", "l_c", "F_u") + "; " + phiBound}},
	{"block_shear_aisc", "", "A_gv=5 in^2, A_nv=4 in^2, A_nt=1 in^2, F_u=58 ksi, F_y=36 ksi, U_bs=1, phi=0.75",
		[]string{"A_nv=0 in^2 | A_nv=-0.0001 in^2; A_nt=0 in^2 | A_nt=-0.0001 in^2; " + positive("F_y") + "; " + phiBound, "A_gv=4 in^2 | A_gv=3.9999 in^2", "F_u=36 ksi | F_u=35.999 ksi", "U_bs=0.5 | U_bs=0.51; U_bs=1 | U_bs=1.01; U_bs=1 | U_bs=0.49"}},
	{"weld_fillet_ec3", "", "F_par=1 kN, F_perp=1 kN, a=5 mm, L=200 mm, f_u=410 MPa, beta_w=0.85, gamma_M2=1.25",
		[]string{"a=3 mm | a=2.9999 mm", "L=30 mm | L=29.9999 mm; a=6 mm, L=36 mm | a=6 mm, L=35.9999 mm", "beta_w=0.8 | beta_w=0.799999; beta_w=1 | beta_w=1.000001", positive("f_u") + "; " + atLeastOne("gamma_M2"), "L=750 mm | L=750.001 mm"}},
	{"weld_fillet_aisc", "", "w=1/4 in, L=4 in, F_EXX=70 ksi, theta=0 deg, phi=0.75",
		[]string{"w=0.04 in | w=0*(@w); " + positive("F_EXX") + "; " + phiBound, "L=1 in | L=0.9999 in", of(toGrain, "theta"), "L=25 in | L=25.0001 in"}},
	{"shear_plastic_ec3", "", "A_v=100 mm^2, f_y=355 MPa, gamma_M0=1", []string{positive("A_v", "f_y") + "; " + atLeastOne("gamma_M0")}},
	{"web_shear_ec3", "", "h_w=1 m, t_w=8 mm, a=1 m, f_yw=355 MPa, E=210 GPa, eta=1.2, rigid=0, gamma_M1=1",
		[]string{positive("h_w", "t_w", "a", "f_yw", "E") + "; " + atLeastOne("gamma_M1"), "eta=1 | eta=0.999999; eta=1.2 | eta=1.200001", "f_yw=460 MPa | f_yw=460.001 MPa; eta=1, f_yw=690 MPa | eta=1.001, f_yw=690 MPa", of(zeroOrOne, "rigid")}},
	{"shear_buckling", "", "a=1 m, b=1 m, t=8 mm, E=210 GPa, nu=0.3", []string{positive("a", "b", "t", "E"), aModulus5}},
}

var otherLimits = []limits{
	{"embedment_ec5", "", "rho_k=350 kg/m^3, d=4 mm, predrilled=0",
		[]string{positive("rho_k", "d"), "d=8 mm, predrilled=1 | d=8.0001 mm, predrilled=1", of(zeroOrOne, "predrilled"), "d=6 mm | d=6.0001 mm; d=8 mm, predrilled=1 | d=8 mm", "rho_k=500 kg/m^3 | rho_k=500.001 kg/m^3; rho_k=600 kg/m^3, predrilled=1 | rho_k=600 kg/m^3"}},
	{"embedment_bolt_ec5", "", "rho_k=350 kg/m^3, d=20 mm, alpha=0 deg, softwood=1",
		[]string{positive("rho_k", "d"), "d=30 mm | d=30.0001 mm", of(toGrain, "alpha"), "softwood=0 | softwood=-1; softwood=1 | softwood=0.5; softwood=2 | softwood=2.001"}},
	{"hankinson", "", "F_par=2 kN, F_perp=1 kN, theta=30 deg", []string{positive("F_par", "F_perp"), of(toGrain, "theta")}},
	{"nail_yield_moment_ec5", "", "f_u=700 MPa, d=4 mm", []string{"f_u=600 MPa | f_u=599.999 MPa", positive("d")}},
	{"dowel_timber_single_ec5", "", "t_1=38 mm, t_2=50 mm, d=4 mm, f_h1=20 MPa, f_h2=20 MPa, M_y=6000 N*mm, F_ax=100 N, rope=0.15",
		[]string{positive("t_1", "t_2", "d", "f_h1", "f_h2", "M_y") + "; F_ax=0 N | F_ax=-0.001 N", ropeBound}},
	{"dowel_timber_double_ec5", "", "t_1=38 mm, t_2=50 mm, d=4 mm, f_h1=20 MPa, f_h2=20 MPa, M_y=6000 N*mm, F_ax=100 N, rope=0.15",
		[]string{positive("t_1", "t_2", "d", "f_h1", "f_h2", "M_y") + "; F_ax=0 N | F_ax=-0.001 N", ropeBound}},
	{"dowel_steel_thin_single_ec5", "", "t_1=38 mm, d=4 mm, f_h=20 MPa, M_y=6000 N*mm, F_ax=100 N, rope=0.15, t_s=0 mm",
		[]string{positive("t_1", "d", "f_h", "M_y") + "; F_ax=0 N | F_ax=-0.001 N", ropeBound, "t_s=2 mm | t_s=2.0001 mm; t_s=0 mm | t_s=-0.0001 mm"}},
	{"dowel_steel_thick_single_ec5", "", "t_1=38 mm, d=4 mm, f_h=20 MPa, M_y=6000 N*mm, F_ax=100 N, rope=0.15, t_s=0 mm",
		[]string{positive("t_1", "d", "f_h", "M_y") + "; F_ax=0 N | F_ax=-0.001 N", ropeBound, "t_s=4 mm | t_s=3.9999 mm; t_s=0 mm | t_s=0.0001 mm"}},
	{"dowel_single_nds", "", "D=0.2 in, l_m=2 in, l_s=2 in, F_em=4650 psi, F_es=4650 psi, F_yb=80 ksi, theta=0 deg, fastener=0",
		[]string{positive("D", "l_m", "l_s", "F_em", "F_es", "F_yb"), "D=1 in, fastener=1 | D=1.00001 in, fastener=1",
			"fastener=0 | fastener=-1; fastener=1, D=0.3 in | fastener=2, D=0.3 in; fastener=0 | fastener=0.5; D=0.24999 in | D=0.25 in; D=0.25 in, fastener=1 | D=0.24999 in, fastener=1", of(toGrain, "theta")}},
	{"punching_ec2", "", "V=500 kN, d=200 mm, c_1=300 mm, c_2=300 mm, f_ck=30 MPa, rho_l=0.01, beta=1.15, gamma_c=1.5",
		[]string{positive("d", "c_1", "c_2") + "; V=0 kN | V=-0.001 kN; rho_l=0 | rho_l=-0.000001; " + atLeastOne("gamma_c"), "f_ck=12 MPa | f_ck=11.9999 MPa; f_ck=90 MPa | f_ck=90.0001 MPa", atLeastOne("beta")}},
	{"two_way_shear_aci", "", "c_1=16 in, c_2=16 in, d=6 in, f_c=4000 psi, lambda=1, alpha_s=40",
		[]string{positive("c_1", "c_2", "d"), "f_c=2500 psi | f_c=2499.9 psi", "lambda=0.75 | lambda=0.749999; lambda=1 | lambda=1.000001", "alpha_s=20 | alpha_s=19.9999; alpha_s=40 | alpha_s=40.0001", "alpha_s=40 | alpha_s=39.999"}},
	{"mohr_coulomb", "", "c=10 kPa, sigma=100 kPa, phi=30 deg", []string{"c=0 kPa | c=-0.0001 kPa", "sigma=0 kPa | sigma=-0.0001 kPa", "phi=0 deg | phi=-0.0001 deg; phi=89.999 deg | phi=90 deg"}},
}

// withArgs puts arguments in place of those of the sound call and returns the call.
func (l limits) withArgs(replace string) string {
	var names []string
	sound := map[string]string{}
	set := map[string]string{}
	for arg := range strings.SplitSeq(l.args, ", ") {
		name, value, _ := strings.Cut(arg, "=")
		names = append(names, name)
		sound[name], set[name] = value, value
	}
	for arg := range strings.SplitSeq(replace, ", ") {
		name, value, _ := strings.Cut(strings.TrimSpace(arg), "=")
		if sound[name] == "" {
			panic(l.helper + " has no argument " + name)
		}
		set[name] = regexp.MustCompile(`@\w+`).ReplaceAllStringFunc(value, func(at string) string { return sound[at[1:]] })
	}
	args := make([]string, len(names))
	for i, n := range names {
		args[i] = n + "=" + set[n]
	}
	return l.helper + "(" + strings.Join(args, ", ") + ")"
}

// complaint finds what a compiled call says of a limit: its severity and the whole message.
func complaint(blocks string, h *syntax.Helper, n *syntax.Needs) (said, failed bool, all string) {
	clause := n.Note.Source
	if clause == "" {
		clause = h.Note.Source
	}
	sheet := compile(blocks)
	for _, d := range sheet.Diagnostics {
		text := d.Message + "\n" + strings.Join(d.Hints, "\n")
		if d.ID == diag.OutOfRange && strings.Contains(text, n.Note.Text) && strings.Contains(text, clause) && (d.Severity == diag.Warning) == n.Warn {
			said = true
		}
	}
	return said, sheet.Failed(), messages(sheet)
}

// Every limit of every helper lets pass what is just inside and stops what is just outside, by its clause.
func TestLimits(t *testing.T) {
	seen := map[string]bool{}
	for _, l := range allLimits {
		seen[l.helper] = true
		h := helpers(t)[l.helper]
		if h == nil {
			t.Fatalf("there is no %s", l.helper)
		}
		var needs []*syntax.Needs
		for _, s := range h.Stmts {
			if n, ok := s.(*syntax.Needs); ok {
				needs = append(needs, n)
			}
		}
		if len(needs) != len(l.bounds) {
			t.Errorf("%s has %d limits, and %d are tested", l.helper, len(needs), len(l.bounds))
			continue
		}
		for i, n := range needs {
			for bound := range strings.SplitSeq(l.bounds[i], ";") {
				inside, outside, _ := strings.Cut(bound, "|")
				call := l.setup + "\nr = " + l.withArgs(inside)
				if said, failed, all := complaint(call, h, n); said || failed {
					t.Errorf("%s\nis inside %s\n%s", l.withArgs(inside), h.Source.Slice(n.At), all)
				}
				call = l.setup + "\nr = " + l.withArgs(outside)
				if said, failed, all := complaint(call, h, n); !said || failed == n.Warn {
					t.Errorf("%s\nis outside %s\n%s", l.withArgs(outside), h.Source.Slice(n.At), all)
				}
			}
		}
	}
	for name, h := range helpers(t) {
		if seen[name] {
			continue
		}
		for _, s := range h.Stmts {
			if n, ok := s.(*syntax.Needs); ok {
				t.Errorf("%s: the limit %s is not tested", name, h.Source.Slice(n.At))
			}
		}
	}
}

// Every limit says what it is, and every warning by which clause. Where an error's limit is no more than
// common sense (a length is positive), the helper's own source stands in its message.
func TestLimitsSayWhatTheyAre(t *testing.T) {
	for name, h := range helpers(t) {
		for _, s := range h.Stmts {
			if n, ok := s.(*syntax.Needs); ok && (n.Note.Text == "" || n.Warn && n.Note.Source == "") {
				t.Errorf("%s: %s has no note or no clause", name, h.Source.Slice(n.At))
			}
		}
	}
}
