package library_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"gusset/notebook/syntax"
)

// outside is every helper checked against figures from outside the project.
func outside() []row {
	return slices.Concat(stressRows(), partRows(), sectionRows(), torsionRows(), stateRows(),
		groupRows(), boltRows(), weldRows(), panelRows(), timberRows(), concreteRows(), soilRows())
}

func TestHelpersAgainstTheOutside(t *testing.T) {
	for _, r := range outside() {
		if r.source == "" {
			t.Errorf("%s: no source", r.call)
		}
		text := r.setup + "\nr = " + r.call + "\n"
		wants := r.wants(t)
		for i, w := range wants {
			text += fmt.Sprintf("g_%d = %s\nw_%d = %s\n", i, w[0], i, w[1])
		}
		sheet := compile(text)
		if sheet.Failed() {
			t.Errorf("%s\n%s", r.call, messages(sheet))
			continue
		}
		for i, w := range wants {
			got, want := step(sheet, fmt.Sprintf("g_%d", i)), step(sheet, fmt.Sprintf("w_%d", i))
			if got == nil || want == nil || len(got.Value.Num) != 1 || len(want.Value.Num) != 1 {
				t.Errorf("%s: `%s` or `%s` is no plain value", r.call, w[0], w[1])
				continue
			}
			g, x := got.Value.Num[0], want.Value.Num[0]
			if w[1] != "0" && got.Value.Type.Dim != want.Value.Type.Dim {
				t.Errorf("%s: %s is %s, want %s", r.call, w[0], got.Value.Type.Dim.Article(), want.Value.Type.Dim.Article())
			}
			if !near(g, x, r.tol) {
				t.Errorf("%s: %s is %.7g, want %s = %.7g (%s)\n%s", r.call, w[0], g, w[1], x, r.source, r.setup)
			}
		}
	}
}

// Every result of every helper stands in the table.
func TestEveryResultIsChecked(t *testing.T) {
	checked := map[string]bool{}
	for _, r := range outside() {
		for _, w := range r.wants(t) {
			for word := range strings.FieldsFuncSeq(w[0], func(c rune) bool {
				return !strings.ContainsRune("._abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789", c)
			}) {
				if word == "r" || strings.HasPrefix(word, "r.") {
					checked[r.name()+strings.TrimPrefix(word, "r")] = true
				}
			}
		}
	}
	for name, h := range helpers(t) {
		for _, g := range h.Gives {
			key := name
			if len(h.Gives) > 1 {
				key += "." + g.ID
			}
			if !checked[key] {
				t.Errorf("%s is checked against nothing", key)
			}
		}
	}
}

// signatures are the helpers as they are called: names, order, defaults and results are a promise.
const signatures = `
axial_stress(N, A) sigma
axial_strain(delta, L) epsilon
axial_elongation(N, L, A, E) delta, epsilon, sigma
direct_shear(V, A, n=1) tau
shear_strain(delta, h) gamma, gamma_small
shear_modulus(E, nu) G
poisson_ratio(E, G) nu
bulk_modulus(E, nu) K
shear_yield_mises(f_y) tau_y
shear_yield_tresca(f_y) tau_y
shear_response(gamma, G, tau_y) tau, gamma_y, mu
shear_deflection(V, L, G, A_s) delta, gamma
thermal_stress(alpha, dT, E) sigma, epsilon
link_shear(P, d) tau, A
head_shear_rectangular(P, w, l, t) tau, A
head_shear_round(P, d, t) tau, A
blanking_force(L, t, tau_u) F
key_shear(T, d, b, h, L) tau, sigma_b
pin_double_shear(P, d, t_1, t_2, g=0) tau, M, sigma, sigma_b1, sigma_b2
lug_tear_out(P, a, d_0, t) tau, A
lug_net_tension(P, w, d_0, t) sigma, A
lap_joint_volkersen(P, b, l, t_1, t_2, E_1, E_2, t_a, G_a) tau_avg, tau_max, k
thread_shear(P, d, p, L_e) tau_ext, A_ext
section_rectangle(b, h) A, I_y, W_y, Q, A_s, J
section_circle(d) A, I, W, Q, A_s, J
section_tube(D, t) A, I, W, Q, J
section_i(h, b, t_w, t_f) A, I_y, I_z, W_y, Q, A_v, J
section_box(h, b, t) A, I_y, W_y, Q, J
beam_shear(V, Q, I, b) tau
beam_shear_rectangle(V, b, h) tau_max, tau_avg
beam_shear_circle(V, d) tau_max, tau_avg
shear_flow(V, Q, I) q
fastener_pitch(F, n, q) s
torsion_circular(T, D, L, G, d=0) tau_max, theta, J
torsion_rectangle(T, a, b, L, G) tau_max, theta, J, k_1, k_2
torsion_thin_closed(T, A_m, t, p, L, G) tau, q, J, theta
torsion_thin_open(T, b, t) tau_max, J
shaft_torque(P, n) T
helical_spring(F, D, d, G, n_a) tau_max, k, delta, K_w
plane_stress(sigma_x, sigma_y, tau_xy) sigma_1, sigma_2, tau_max, tau_abs, theta_p, sigma_v, sigma_tresca
stress_rotate(sigma_x, sigma_y, tau_xy, theta) sigma_n, sigma_t, tau_nt
stress_3d(sigma_x, sigma_y, sigma_z, tau_xy, tau_yz, tau_zx) sigma_1, sigma_2, sigma_3, tau_max, sigma_v
strain_from_stress(sigma_x, sigma_y, tau_xy, E, nu) epsilon_x, epsilon_y, epsilon_z, gamma_xy
stress_from_strain(epsilon_x, epsilon_y, gamma_xy, E, nu) sigma_x, sigma_y, tau_xy
rosette_45(epsilon_0, epsilon_45, epsilon_90) epsilon_x, epsilon_y, gamma_xy, epsilon_1, epsilon_2, gamma_max, theta_p
rosette_60(epsilon_0, epsilon_60, epsilon_120) epsilon_x, epsilon_y, gamma_xy, epsilon_1, epsilon_2, gamma_max, theta_p
bolt_group_elastic(x, y, P_x, P_y, M) F_x, F_y, F, F_max, I_p
bolt_group_ic(x, y, e, theta=0, R_u=1 kN) C, P_u, x_ic, y_ic
weld_group_elastic(x1, y1, x2, y2, P_x, P_y, M) q_max, L, I_p
bolt_shear_ec3(A, f_ub, alpha_v, n=1, gamma_M2=1.25) F_v_Rd
bolt_bearing_ec3(d, d_0, t, e_1, e_2, f_u, f_ub, gamma_M2=1.25, p_1=0, p_2=0) F_b_Rd, k_1, alpha_b
bolt_tension_shear_ec3(F_v, F_v_Rd, F_t, F_t_Rd) u
block_tearing_ec3(A_nt, A_nv, f_u, f_y, gamma_M2=1.25, gamma_M0=1.0) V_eff_Rd
pin_ec3(F, d, a, b, c, f_up, f_yp, f_y, gamma_M0=1.0, gamma_M2=1.25) F_v_Rd, F_b_Rd, M_Ed, M_Rd, u_v, u_b, u_m, u_mv
pin_plate_ec3(F, t, d_0, f_y, gamma_M0=1.0) a_min, c_min
weld_fillet_ec3(F_par, F_perp, a, L, f_u, beta_w, gamma_M2=1.25) sigma_perp, tau_perp, tau_par, u
bolt_shear_aisc(A_b, F_nv, n=1, phi=0.75) R_n, phi_R_n
bolt_bearing_aisc(d, t, l_c, F_u, phi=0.75) R_n, phi_R_n
block_shear_aisc(A_gv, A_nv, A_nt, F_u, F_y, U_bs=1.0, phi=0.75) R_n, phi_R_n
weld_fillet_aisc(w, L, F_EXX, theta=0, phi=0.75) R_n, phi_R_n
embedment_ec5(rho_k, d, predrilled=0) f_h_k
embedment_bolt_ec5(rho_k, d, alpha=0, softwood=1) f_h_k, f_h_0_k, k_90
hankinson(F_par, F_perp, theta) F_theta
nail_yield_moment_ec5(f_u, d) M_y_Rk
dowel_timber_single_ec5(t_1, t_2, d, f_h1, f_h2, M_y, F_ax=0, rope=0.15) F_v_Rk, F_a, F_b, F_c, F_d, F_e, F_f
dowel_timber_double_ec5(t_1, t_2, d, f_h1, f_h2, M_y, F_ax=0, rope=0.15) F_v_Rk, F_g, F_h, F_j, F_k
dowel_steel_thin_single_ec5(t_1, d, f_h, M_y, F_ax=0, rope=0.15, t_s=0) F_v_Rk, F_a, F_b
dowel_steel_thick_single_ec5(t_1, d, f_h, M_y, F_ax=0, rope=0.15, t_s=0) F_v_Rk, F_c, F_d, F_e
dowel_single_nds(D, l_m, l_s, F_em, F_es, F_yb, theta=0, fastener=0) Z, Z_Im, Z_Is, Z_II, Z_IIIm, Z_IIIs, Z_IV
shear_plastic_ec3(A_v, f_y, gamma_M0=1.0) V_pl_Rd
web_shear_ec3(h_w, t_w, a, f_yw, E=210 GPa, eta=1.2, rigid=0, gamma_M1=1.0) V_bw_Rd, chi_w, lambda_w, k_tau
shear_buckling(a, b, t, E, nu=0.3) k_tau, tau_cr, sigma_E
punching_ec2(V, d, c_1, c_2, f_ck, rho_l, beta=1.15, gamma_c=1.5) u_1, v_Ed, v_Rd_c, u, v_Ed_0, v_Rd_max
two_way_shear_aci(c_1, c_2, d, f_c, lambda=1, alpha_s=40) b_0, v_c, V_c
mohr_coulomb(c, sigma, phi) tau_f
`

func TestSignatures(t *testing.T) {
	all := helpers(t)
	n := 0
	for line := range strings.SplitSeq(strings.TrimSpace(signatures), "\n") {
		n++
		name, _, _ := strings.Cut(line, "(")
		h := all[name]
		if h == nil {
			t.Errorf("there is no %s", name)
			continue
		}
		if got := signature(h); got != line {
			t.Errorf("got  %s\nwant %s", got, line)
		}
	}
	if n != len(all) {
		t.Errorf("%d signatures for %d helpers", n, len(all))
	}
}

func signature(h *syntax.Helper) string {
	params := make([]string, len(h.Params))
	for i, p := range h.Params {
		params[i] = p.Name.ID
		if p.Default != nil {
			params[i] += "=" + h.Source.Slice(p.Default.Span())
		}
	}
	gives := make([]string, len(h.Gives))
	for i, g := range h.Gives {
		gives[i] = g.ID
	}
	return h.Name.ID + "(" + strings.Join(params, ", ") + ") " + strings.Join(gives, ", ")
}
