/* test_one_point.c - one point without a plan, and the events that any two quantities fix. */
#include "evaluated.h"

#include "beamhours/physics/one_photon.h"
#include "beamhours/run/event_search.h"
#include "beamhours/run/one_point.h"
#include "beamhours/units/constants.h"

static bh_single_request request_of(const char *particle, double kinetic, double angle)
{
    bh_single_request r = {
        .z = 1, .a = 1, .kinetic = kinetic, .angle = angle, .q2 = NAN, .epsilon = NAN};
    ck_assert(bh_particle_find(particle, &r.beam));
    return r;
}

static double value_of(const bh_single *single, const char *key)
{
    for (size_t i = 0; i < single->count; i++)
        if (strcmp(single->values[i].key, key) == 0)
            return single->values[i].value;
    return (double)NAN;
}

static void check_values(const bh_single *single, int count, const char *const *keys,
                         const double *values, const char *source)
{
    for (int i = 0; i < count; i++)
        ck_assert_msg(fabs(value_of(single, keys[i]) / values[i] - 1) < 2e-11,
                      "%s: %.13g, wanted %.13g (%s)", keys[i], value_of(single, keys[i]), values[i],
                      source);
}

#define SPINORS "closed form = explicit 4x4 Dirac spinor sum, 12 digits"

/* Muon of 210 MeV/c on a proton at 60 deg.  s = m^2 + M^2 + 2 M E from the same inputs. */
START_TEST(a_point_has_its_values)
{
    const double m = BH_MASS_MUON, M = BH_MASS_PROTON, p = 210;
    bh_single_request r = request_of("muon-", p * p / (sqrt(p * p + m * m) + m), 60 * BH_DEGREE);
    r.structure = "kelly-2004";
    bh_single out;
    bh_error err = {.code = BH_OK};
    ck_assert_msg(bh_single_compute(&r, &out, &err) == BH_OK, "%s", err.text);
    const double s = m * m + M * M + 2 * M * 235.082309656, q2 = 39245.868451;
    static const char *const keys[] = {"angle_deg",
                                       "scattered_angle_deg",
                                       "q2_GeV2",
                                       "epsilon",
                                       "s_GeV2",
                                       "t_GeV2",
                                       "u_GeV2",
                                       "point_cross_section_ub_per_sr",
                                       "mott_cross_section_ub_per_sr"};
    const double values[] = {60,
                             60,
                             q2 * 1e-6,
                             0.82575577254,
                             s * 1e-6,
                             -q2 * 1e-6,
                             (2 * m * m + 2 * M * M - s + q2) * 1e-6,
                             1.48636242271,
                             1.72597689302};
    check_values(&out, COUNT(keys), keys, values, SPINORS);
    ck_assert_str_eq(out.warning[0], "");
    /* energies and momenta of the struck proton: T = q2 / 2M, p^2 = T^2 + 2 M T = q2 (1 + tau) */
    const double T = q2 / (2 * M), momentum = sqrt(T * T + 2 * M * T);
    ck_assert_double_eq_tol(value_of(&out, "recoil_kinetic_MeV"), T, 1e-8);
    ck_assert_double_eq_tol(value_of(&out, "q_per_fm") * 197.3269804593, momentum, 1e-7);
    ck_assert_double_eq_tol(value_of(&out, "scattered_kinetic_MeV"), 214.168403715 - m, 1e-8);
    ck_assert_double_eq_tol(value_of(&out, "beam_kinetic_MeV"), 235.082309656 - m, 1e-8);
}
END_TEST

/* The struck proton detected instead, where it goes: the same event. */
START_TEST(the_recoil_sees_the_same_event)
{
    bh_single_request r = request_of("electron", 1000 - BH_MASS_ELECTRON, 30 * BH_DEGREE);
    bh_single out, seen;
    bh_error err = {.code = BH_OK};
    ck_assert_int_eq(bh_single_compute(&r, &out, &err), BH_OK);
    r.angle = value_of(&out, "recoil_angle_deg") * BH_DEGREE;
    r.recoil = true;
    ck_assert_int_eq(bh_single_compute(&r, &seen, &err), BH_OK);
    ck_assert_double_eq_tol(value_of(&seen, "scattered_angle_deg"), 30, 1e-10);
    ck_assert_double_eq_tol(value_of(&seen, "angle_deg"), r.angle / BH_DEGREE, 1e-12);
    ck_assert_double_eq_tol(value_of(&seen, "q2_GeV2"), value_of(&out, "q2_GeV2"), 1e-12);
    ck_assert_double_eq_tol(value_of(&seen, "central_momentum_MeV_per_c"),
                            1e3 * sqrt(value_of(&out, "q2_GeV2") *
                                       (1 + value_of(&out, "q2_GeV2") / 4 / 0.880354513855)),
                            1e-6);
    /* dsigma is the same: sigma dOmega of both */
    const double h = 1e-5;
    bh_single_request near = request_of("electron", 1000 - BH_MASS_ELECTRON, 30 * BH_DEGREE + h);
    bh_single moved;
    ck_assert_int_eq(bh_single_compute(&near, &moved, &err), BH_OK);
    const double turned =
        cos(value_of(&moved, "recoil_angle_deg") * BH_DEGREE) - cos(r.angle); /* of the recoil */
    const double share = (cos(30 * BH_DEGREE) - cos(30 * BH_DEGREE + h)) / turned;
    ck_assert_double_eq_tol(value_of(&seen, "point_cross_section_ub_per_sr") /
                                value_of(&out, "point_cross_section_ub_per_sr"),
                            share, 1e-4 * share);
}
END_TEST

/* 10 uA on 10 cm of liquid hydrogen of 0.0723 g/cm3: 2.695989981e37 protons /cm2 s by hand, of
 * which 1H is all but 115 ppm; and a slow alpha on gold is Rutherford's. */
START_TEST(a_rate_multiplies_out)
{
    static const char *const folders[] = {"materials", NULL};
    bh_material_library *library = bh_material_library_new(folders);
    bh_error err = {.code = BH_OK};
    bh_diags *diags = bh_diags_new();
    const bh_material *hydrogen =
        bh_material_find(library, "liquid-hydrogen", (bh_mark){0}, "material", diags);
    ck_assert_ptr_nonnull(hydrogen);
    bh_single_request r = request_of("electron", 1000, 30 * BH_DEGREE);
    r.current = 10e-6;
    r.material = hydrogen;
    r.thickness = 10 * 0.0723 / hydrogen->density;
    r.solid_angle = 0.006;
    bh_single out;
    ck_assert_msg(bh_single_compute(&r, &out, &err) == BH_OK, "%s", err.text);
    const double luminosity = value_of(&out, "luminosity_per_cm2_s");
    ck_assert_double_eq_tol(luminosity / 2.695989981e37, 1, 3e-4);
    ck_assert_double_eq_tol(value_of(&out, "beam_per_s") / (10e-6 / 1.602176634e-19), 1, 1e-12);
    ck_assert_double_eq_tol(
        value_of(&out, "seen_per_cm2") * value_of(&out, "beam_per_s") / luminosity, 1, 1e-14);
    ck_assert_double_eq_tol(value_of(&out, "solid_angle_msr"), 6, 1e-12);
    const double sigma = value_of(&out, "point_cross_section_ub_per_sr");
    ck_assert_double_eq_tol(value_of(&out, "signal_rate_Hz") / (luminosity * sigma * 1e-30 * 0.006),
                            1, 1e-13);
    r.solid_angle = 0;
    ck_assert_int_eq(bh_single_compute(&r, &out, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "--solid-angle"));
    r.solid_angle = 0.006;
    r.z = 6;
    r.a = 12;
    ck_assert_int_eq(bh_single_compute(&r, &out, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "there is no 12C in liquid-hydrogen"));
    bh_diags_free(diags);
    bh_material_library_free(library);
}
END_TEST

START_TEST(an_alpha_on_gold)
{
    bh_single_request r = request_of("alpha", 2, 170 * BH_DEGREE);
    r.z = 79;
    r.a = 197;
    r.structure = "point";
    bh_single out;
    bh_error err = {.code = BH_OK};
    ck_assert_msg(bh_single_compute(&r, &out, &err) == BH_OK, "%s", err.text);
    /* own nonrelativistic calculation with atomic masses: 8.205546731 b/sr */
    ck_assert_double_eq_tol(value_of(&out, "rutherford_cross_section_ub_per_sr") / 8.205546731e6, 1,
                            1e-4);
    ck_assert_double_eq_tol(value_of(&out, "point_cross_section_ub_per_sr") / 8.205546731e6, 1,
                            2e-3);
    ck_assert(isnan(value_of(&out, "epsilon")));
    ck_assert(isnan(value_of(&out, "mott_cross_section_ub_per_sr")));
    ck_assert_ptr_nonnull(strstr(out.formula, "Rutherford"));
}
END_TEST

START_TEST(a_model_beyond_its_data_says_so)
{
    bh_single_request r = request_of("electron", (double)NAN, 30 * BH_DEGREE);
    r.structure = "dipole"; /* good up to 1 GeV2 */
    bh_single out;
    bh_error err = {.code = BH_OK};
    static const double gev2[] = {0.99, 1.01, 1.4};
    for (int i = 0; i < COUNT(gev2); i++) {
        r.q2 = gev2[i] * 1e6;
        ck_assert_msg(bh_single_compute(&r, &out, &err) == BH_OK, "%s", err.text);
        ck_assert_int_eq(strstr(out.warning[0], "dipole is fitted to data") != NULL, gev2[i] > 1);
        ck_assert_double_eq_tol(value_of(&out, "q2_GeV2"), gev2[i], 1e-12);
    }
}
END_TEST

START_TEST(what_cannot_be_is_refused)
{
    bh_single_request r = request_of("electron", 1000, 30 * BH_DEGREE);
    bh_single out;
    bh_error err = {.code = BH_OK};
    r.a = 9;
    ck_assert_int_eq(bh_single_compute(&r, &out, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "no nuclide"));
    r.a = 1;
    r.process = "guessing";
    ck_assert_int_eq(bh_single_compute(&r, &out, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "no process \"guessing\""));
    r.process = NULL;
    r.structure = "guess";
    ck_assert_int_ne(bh_single_compute(&r, &out, &err), BH_OK);
}
END_TEST

/* --- any two of four --- */

static const bh_known nothing = {NAN, NAN, NAN, NAN, false};

static bh_known two_of(const bh_event *e, double kinetic, int which, bool recoil)
{
    bh_known k = nothing;
    k.recoil = recoil;
    const double angle = recoil ? e->recoil_angle : e->scattered_angle;
    const double all[4] = {kinetic, angle, e->q2, e->epsilon};
    double *const place[4] = {&k.kinetic, &k.angle, &k.q2, &k.epsilon};
    static const int pairs[6][2] = {{0, 1}, {0, 2}, {0, 3}, {1, 2}, {1, 3}, {2, 3}};
    for (int i = 0; i < 2; i++)
        *place[pairs[which][i]] = all[pairs[which][i]];
    return k;
}

/* Each pair, by either particle, leads back to the event it was taken from. */
START_TEST(any_two_fix_the_event)
{
    static const bh_collision masses[] = {{BH_MASS_ELECTRON, BH_MASS_PROTON, 0},
                                          {BH_MASS_MUON, BH_MASS_PROTON, 0},
                                          {BH_MASS_ELECTRON, 11174.9, 0}};
    int same = 0;
    for (int i = 0; i < COUNT(masses) * 24; i++) {
        bh_collision in = masses[i % COUNT(masses)];
        in.kinetic = 40 * pow(1.23, i % 12);
        bh_event e, found;
        const double angle = (15 + 37 * (i % 4)) * BH_DEGREE;
        ck_assert_int_eq(bh_kinematics_scattered(&in, angle, BH_BRANCH_FAST, &e, NULL), BH_OK);
        for (int which = 0; which < 6; which++)
            for (int recoil = 0; recoil < 2; recoil++) {
                const bh_known known = two_of(&e, in.kinetic, which, recoil);
                double kinetic = 0;
                bh_error err = {.code = BH_OK};
                const bh_code code = bh_event_search(&in, &known, &kinetic, &found, &err);
                if (which == 4 && recoil && in.mass > 100)
                    continue; /* epsilon has a minimum: two energies as close as one likes */
                ck_assert_msg(code == BH_OK, "pair %d: %s", which, err.text);
                ck_assert_double_eq_tol(found.epsilon / e.epsilon, 1, 1e-8);
                if (which == 4 && recoil && kinetic > 1.001 * in.kinetic)
                    continue; /* the more energetic of two */
                ck_assert_double_eq_tol(kinetic / in.kinetic, 1, 2e-8);
                ck_assert_double_eq_tol(found.q2 / e.q2, 1, 4e-8);
                ck_assert_double_eq_tol(found.scattered_angle, angle, 1e-7);
                same++;
            }
    }
    ck_assert_int_gt(same, COUNT(masses) * 24 * 11);
}
END_TEST

START_TEST(not_exactly_two_are_refused)
{
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 0};
    const double all[4] = {855, 1, 2e5, 0.7};
    for (int set = 0; set < 16; set++) {
        bh_known k = nothing;
        double *const place[4] = {&k.kinetic, &k.angle, &k.q2, &k.epsilon};
        int given = 0;
        for (int i = 0; i < 4; i++)
            if (set & 1 << i) {
                *place[i] = all[i];
                given++;
            }
        bh_event e;
        bh_error err = {.text = ""};
        double kinetic = 0;
        const bh_code code = bh_event_search(&in, &k, &kinetic, &e, &err);
        char words[32];
        snprintf(words, sizeof words, "%d were given", given);
        ck_assert_int_eq(code == BH_EDOMAIN && strstr(err.text, words) != NULL, given != 2);
    }
    const bh_known far = {NAN, 89 * BH_DEGREE, 1e11, NAN, true};
    bh_event e;
    bh_error err = {.text = ""};
    double kinetic = 0;
    ck_assert_int_eq(bh_event_search(&in, &far, &kinetic, &e, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "no beam energy"));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("one point");
    tcase_add_test(tests, a_point_has_its_values);
    tcase_add_test(tests, the_recoil_sees_the_same_event);
    tcase_add_test(tests, a_rate_multiplies_out);
    tcase_add_test(tests, an_alpha_on_gold);
    tcase_add_test(tests, a_model_beyond_its_data_says_so);
    tcase_add_test(tests, what_cannot_be_is_refused);
    tcase_add_test(tests, any_two_fix_the_event);
    tcase_add_test(tests, not_exactly_two_are_refused);
    return run_suite("run/one_point", tests);
}
