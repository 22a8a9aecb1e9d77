/* test_background.c - the registry of backgrounds and their integrals over a momentum bite. */
#include "../suite.h"

#include <math.h>
#include <string.h>

#include "beamhours/physics/atomic_electron.h"
#include "beamhours/physics/background.h"
#include "beamhours/physics/inelastic.h"
#include "beamhours/physics/momentum_range.h"
#include "beamhours/physics/quasi_elastic.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

#define D  BH_DEGREE
#define ME BH_MASS_ELECTRON

static bh_particle particle(const char *name)
{
    bh_particle out;
    ck_assert(bh_particle_find(name, &out));
    return out;
}

static bh_encounter on(const bh_particle *beam, int z, int a, double kinetic)
{
    const bh_nuclide *n = bh_nuclide_find(z, a);
    return (bh_encounter){.beam = beam,
                          .charge = beam->charge,
                          .z = z,
                          .a = a,
                          .target = n ? n->mass : 0.0,
                          .kinetic = kinetic};
}

typedef struct {
    double value;
    bh_background_validity validity;
} answer;

static answer ask(const char *row, const bh_encounter *x, bh_momentum_range range)
{
    answer out = {-77.0, {BH_COMPUTED, -77.0, -77.0, NULL}};
    const bh_background *b = bh_background_find(row);
    ck_assert_ptr_nonnull(b);
    b->momentum_integral(x, &range, &out.value, &out.validity);
    ck_assert(out.value >= 0.0 && out.validity.reason != NULL);
    ck_assert((out.validity.state == BH_COMPUTED) == (out.validity.reason[0] == '\0'));
    ck_assert(out.validity.share >= 0.0 && out.validity.share <= 1.0);
    return out;
}

/* The same by brute force. */
static double simple(const bh_encounter *x, const bh_momentum_range *range)
{
    enum { STEPS = 400000 };
    const bh_inclusive in = {x->beam->mass, x->kinetic, range->angle};
    const double step = (range->momentum_to - range->momentum_from) / STEPS;
    bh_quasi_nucleus n = {0};
    if (x->a > 2)
        ck_assert_int_eq(bh_quasi_find(x->z, x->a, BH_QUASI_SCALING, &n, NULL), BH_OK);
    double sum = 0.0;
    for (int i = 0; i < STEPS; i++) {
        const bh_transfer at = bh_inclusive_transfer(&in, range->momentum_from + (i + 0.5) * step);
        if (x->a > 2 ? bh_quasi_outside(&n, &at) : bh_inelastic_outside(x->a, &at))
            continue;
        sum += (x->a > 2 ? bh_quasi_cross_section(&n, &in, &at)
                         : bh_inelastic_cross_section(x->a, &in, &at)) *
               at.momentum / at.energy * step;
    }
    return sum;
}

static const struct {
    const char *row, *beam;
    int z, a;
    double kinetic, degrees, from, to; /* [MeV] [deg] [MeV/c] */
    bh_computed state;
} cases[] = {
    {"quasi-elastic", "electron", 6, 12, 855, 40, 660, 800, BH_COMPUTED},
    {"quasi-elastic", "electron", 6, 12, 855, 40, 100, 855, BH_COMPUTED_PART},
    {"quasi-elastic", "electron", 13, 27, 2200, 15, 1960, 2150, BH_COMPUTED},
    {"quasi-elastic", "positron", 82, 208, 600, 60, 300, 500, BH_COMPUTED_PART},
    {"quasi-elastic", "muon+", 6, 12, 400, 90, 100, 350, BH_COMPUTED_PART},
    {"quasi-elastic", "electron", 26, 56, 4000, 20, 2000, 3900, BH_COMPUTED_PART},
    {"quasi-elastic", "electron", 73, 181, 500, 120, 240, 300, BH_COMPUTED},
    {"inelastic", "electron", 1, 1, 4000, 25, 900, 1500, BH_COMPUTED},
    {"inelastic", "electron", 1, 1, 4000, 25, 100, 4000, BH_COMPUTED_PART},
    {"inelastic", "electron", 1, 2, 4000, 25, 900, 2000, BH_COMPUTED},
    {"inelastic", "electron", 1, 1, 10000, 20, 1000, 6000, BH_COMPUTED_PART},
    {"inelastic", "muon-", 1, 1, 6000, 30, 700, 3300, BH_COMPUTED_PART},
};

START_TEST(integrals_agree_with_brute_force)
{
    const bh_particle beam = particle(cases[_i].beam);
    const bh_encounter x = on(&beam, cases[_i].z, cases[_i].a, cases[_i].kinetic);
    const bh_momentum_range range = {cases[_i].degrees * D, cases[_i].from, cases[_i].to};
    const answer got = ask(cases[_i].row, &x, range);
    const double want = simple(&x, &range);
    ck_assert_msg(want > 0.0 && fabs(got.value / want - 1.0) < 2e-5, "%.9g ub/sr, want %.9g",
                  got.value, want);
    ck_assert_msg(got.validity.state == cases[_i].state, "share %.4f: %s", got.validity.share,
                  got.validity.reason);
    ck_assert_double_gt(got.validity.uncertainty, 0.03);
    ck_assert_double_lt(got.validity.uncertainty, 0.51);
}
END_TEST

START_TEST(halves_add_up)
{
    const bh_particle beam = particle(cases[_i].beam);
    const bh_encounter x = on(&beam, cases[_i].z, cases[_i].a, cases[_i].kinetic);
    const double from = cases[_i].from, to = cases[_i].to, middle = from + 0.37 * (to - from);
    const double angle = cases[_i].degrees * D;
    const answer whole = ask(cases[_i].row, &x, (bh_momentum_range){angle, from, to});
    const answer low = ask(cases[_i].row, &x, (bh_momentum_range){angle, from, middle});
    const answer high = ask(cases[_i].row, &x, (bh_momentum_range){angle, middle, to});
    ck_assert_double_eq_tol((low.value + high.value) / whole.value, 1.0, 1e-5);
    ck_assert_double_eq_tol(0.37 * low.validity.share + 0.63 * high.validity.share,
                            whole.validity.share, 1e-9);
}
END_TEST

START_TEST(nothing_is_faster_than_the_beam)
{
    const bh_particle beam = particle(cases[_i].beam);
    const bh_encounter x = on(&beam, cases[_i].z, cases[_i].a, cases[_i].kinetic);
    const double angle = cases[_i].degrees * D, p = 1.01 * (x.kinetic + beam.mass);
    const answer none = ask(cases[_i].row, &x, (bh_momentum_range){angle, p, 2.0 * p});
    ck_assert(none.value == 0.0 && none.validity.state == BH_COMPUTED);
    const answer most = ask(cases[_i].row, &x, (bh_momentum_range){angle, cases[_i].from, p});
    const answer open =
        ask(cases[_i].row, &x, (bh_momentum_range){angle, cases[_i].from, (double)INFINITY});
    ck_assert_double_eq(most.value, open.value);
    ck_assert_double_eq(most.validity.share, open.validity.share);
}
END_TEST

START_TEST(not_computed_is_said)
{
    static const struct {
        const char *row;
        int z, a;
        double kinetic, degrees, from, to;
        const char *word;
    } rows[] = {
        {"quasi-elastic", 2, 4, 855, 40, 500, 800, "6Li"},
        {"quasi-elastic", 6, 12, 100, 40, 20, 70, "200 MeV/c"},
        {"quasi-elastic", 6, 12, 855, 40, 100, 200, "psi'"},
        {"quasi-elastic", 6, 12, 6000, 60, 500, 900, "1400"},
        {"inelastic", 1, 1, 900, 60, 430, 500, "W of 1.18"},
        {"inelastic", 1, 2, 500, 40, 350, 400, "deuteron"},
    };
    const bh_particle beam = particle("electron");
    const bh_encounter x = on(&beam, rows[_i].z, rows[_i].a, rows[_i].kinetic);
    const bh_momentum_range range = {rows[_i].degrees * D, rows[_i].from, rows[_i].to};
    const answer got = ask(rows[_i].row, &x, range);
    ck_assert_msg(got.validity.state == BH_NOT_COMPUTED && got.value == 0.0 &&
                      got.validity.share == 0.0 && strstr(got.validity.reason, rows[_i].word),
                  "%g ub/sr, %s", got.value, got.validity.reason);
}
END_TEST

/* Around the elastic peak of hydrogen there is nothing, and that is known. */
START_TEST(nothing_at_the_elastic_peak)
{
    const bh_particle beam = particle("electron");
    const bh_encounter x = on(&beam, 1, 1, 855.0);
    const bh_collision in = {ME, x.target, x.kinetic};
    bh_event e;
    ck_assert_int_eq(bh_kinematics_scattered(&in, 40.0 * D, BH_BRANCH_FAST, &e, NULL), BH_OK);
    const double p = e.scattered_momentum;
    const answer got = ask("inelastic", &x, (bh_momentum_range){40.0 * D, 0.95 * p, 1.05 * p});
    ck_assert(got.value == 0.0 && got.validity.state == BH_COMPUTED);
}
END_TEST

START_TEST(atomic_electrons_have_one_momentum)
{
    static const struct {
        const char *row, *beam;
        bh_atomic_seen seen;
        double degrees;
    } rows[] = {{"atomic-electrons", "electron", BH_ATOMIC_SCATTERED, 3.0},
                {"atomic-electrons", "positron", BH_ATOMIC_SCATTERED, 3.0},
                {"knock-on", "positron", BH_ATOMIC_STRUCK, 8.0},
                {"knock-on", "muon-", BH_ATOMIC_STRUCK, 8.0},
                {"atomic-electrons", "muon+", BH_ATOMIC_SCATTERED, 0.2},
                {"atomic-electrons", "muon+", BH_ATOMIC_SCATTERED_SLOW, 0.2}};
    const bh_particle beam = particle(rows[_i].beam);
    const bh_encounter x = on(&beam, 6, 12, 855.0);
    bh_atomic_event e;
    ck_assert_int_eq(bh_atomic_electron(&beam, 855.0, rows[_i].seen, rows[_i].degrees * D, &e),
                     BH_OK);
    bh_momentum_range range = {rows[_i].degrees * D, 0.9999 * e.momentum, 1.0001 * e.momentum};
    const answer in = ask(rows[_i].row, &x, range);
    ck_assert_msg(fabs(in.value / (6.0 * e.cross_section) - 1.0) < 1e-12, "%g", in.value);
    ck_assert_double_eq(in.validity.uncertainty, 0.01);
    range.momentum_to = 0.99995 * e.momentum;
    const answer below = ask(rows[_i].row, &x, range);
    ck_assert(below.value == 0.0 && below.validity.state == BH_COMPUTED);
}
END_TEST

START_TEST(bound_electrons_are_not_computed)
{
    const bh_particle beam = particle("electron");
    const bh_encounter x = on(&beam, 82, 208, 855.0);
    const answer got = ask("atomic-electrons", &x, (bh_momentum_range){1e-5, 0.0, 900.0});
    ck_assert_int_eq(got.validity.state, BH_NOT_COMPUTED);
    ck_assert_ptr_nonnull(strstr(got.validity.reason, "binding"));
}
END_TEST

START_TEST(no_electron_comes_backwards)
{
    const bh_particle beam = particle("electron"), muon = particle("muon-");
    const bh_encounter x = on(&beam, 6, 12, 855.0), y = on(&muon, 6, 12, 855.0);
    const bh_momentum_range back = {100.0 * D, 0.0, 900.0};
    ck_assert_double_eq(ask("atomic-electrons", &x, back).value, 0.0);
    ck_assert_int_eq(ask("atomic-electrons", &x, back).validity.state, BH_COMPUTED);
    ck_assert_double_eq(ask("knock-on", &y, back).value, 0.0);
    ck_assert_double_eq(ask("atomic-electrons", &y, back).value, 0.0);
}
END_TEST

START_TEST(bad_input_is_refused)
{
    static const struct {
        double kinetic, angle, from, to;
    } rows[] = {
        {855, (double)NAN, 100, 200},
        {855, 0, 100, 200},
        {855, 4, 100, 200},
        {855, 1, (double)NAN, 200},
        {855, 1, 100, (double)NAN},
        {855, 1, 200, 100},
        {855, 1, -1, 100},
        {(double)NAN, 1, 100, 200},
        {-5, 1, 100, 200},
        {(double)INFINITY, 1, 1, 2},
        {855, 1, (double)INFINITY, (double)INFINITY},
    };
    const bh_particle beam = particle("positron");
    const bh_background *b;
    for (int i = 0; (b = bh_background_at(i)) != NULL; i++) {
        const bh_encounter x = on(&beam, 6, 12, rows[_i].kinetic);
        const answer got =
            ask(b->name, &x, (bh_momentum_range){rows[_i].angle, rows[_i].from, rows[_i].to});
        ck_assert(got.value == 0.0 && got.validity.state == BH_NOT_COMPUTED);
        ck_assert_ptr_nonnull(strstr(got.validity.reason, "no numbers"));
    }
}
END_TEST

START_TEST(who_does_what)
{
    static const struct {
        const char *row, *beam;
        int z, a;
        bool does;
    } rows[] = {
        {"quasi-elastic", "electron", 6, 12, true},    {"quasi-elastic", "electron", 1, 2, false},
        {"quasi-elastic", "proton", 6, 12, false},     {"quasi-elastic", "muon-", 2, 3, true},
        {"inelastic", "electron", 1, 1, true},         {"inelastic", "muon+", 1, 2, true},
        {"inelastic", "electron", 6, 12, false},       {"inelastic", "alpha", 1, 1, false},
        {"atomic-electrons", "electron", 6, 12, true}, {"atomic-electrons", "proton", 6, 12, false},
        {"atomic-electrons", "electron", 0, 1, false}, {"knock-on", "electron", 6, 12, false},
        {"knock-on", "positron", 6, 12, true},         {"knock-on", "muon-", 1, 1, true},
    };
    const bh_particle beam = particle(rows[_i].beam);
    const bh_background *b = bh_background_find(rows[_i].row);
    ck_assert(b->applies(&beam, rows[_i].z, rows[_i].a) == rows[_i].does);
}
END_TEST

START_TEST(registry)
{
    const bh_background *b;
    int n = 0;
    for (; (b = bh_background_at(n)) != NULL; n++) {
        ck_assert_ptr_eq(bh_background_find(b->name), b);
        ck_assert(strlen(b->summary) > 0 && strlen(b->source) > 0 && strlen(b->range) > 0);
        ck_assert(b->sharp || !b->recoil);
    }
    ck_assert_int_eq(n, 4);
    ck_assert_ptr_null(bh_background_at(-1));
    ck_assert_ptr_null(bh_background_find("pions"));
    ck_assert_ptr_null(bh_background_find(NULL));
}
END_TEST

/* A spectrum too rough for any number of halves still comes to an end. */
static void rough(const void *context, const bh_inclusive *in, const bh_transfer *at, double *value,
                  double *doubt)
{
    (void)context;
    (void)in;
    *value = fmod(at->momentum * 9973.7, 1.0);
    *doubt = 0.5;
}

static const char *all_inside(const void *context, const bh_transfer *at)
{
    (void)context;
    (void)at;
    return NULL;
}

START_TEST(rough_spectra_end)
{
    const bh_inclusive in = {0.0, 500.0, 1.0};
    const bh_spectrum s = {.in = &in, .spectrum = rough, .outside = all_inside};
    const bh_momentum_range range = {1.0, 100.0, 200.0};
    double value;
    bh_background_validity validity;
    bh_momentum_range_integral(&s, &range, &value, &validity);
    ck_assert_double_eq_tol(value, 50.0, 2.5);
    ck_assert_double_eq_tol(validity.uncertainty, 0.5, 1e-12);
}
END_TEST

/* Up to where no nucleon comes out, momentum transfers under 200 MeV/c are not computed, however
 * much of the range lies beyond it, where there is nothing to compute. */
START_TEST(slow_below_the_threshold)
{
    const bh_particle electron = particle("electron");
    const bh_encounter x = on(&electron, 13, 27, 855.0);
    const double angle = 12.0 * D; /* q = 178 MeV/c along the elastic line */
    const answer slow = ask("quasi-elastic", &x, (bh_momentum_range){angle, 780.0, 855.0});
    ck_assert_double_eq(slow.value, 0.0);
    ck_assert_int_eq(slow.validity.state, BH_COMPUTED_PART);
    ck_assert_double_lt(slow.validity.share, 0.5);
    const answer beyond = ask("quasi-elastic", &x, (bh_momentum_range){angle, 850.0, 855.0});
    ck_assert_double_eq(beyond.value, 0.0);
    ck_assert_int_eq(beyond.validity.state, BH_COMPUTED);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("background");
    tcase_set_timeout(tests, 120.0);
    tcase_add_loop_test(tests, integrals_agree_with_brute_force, 0, COUNT(cases));
    tcase_add_loop_test(tests, halves_add_up, 0, COUNT(cases));
    tcase_add_loop_test(tests, nothing_is_faster_than_the_beam, 0, COUNT(cases));
    tcase_add_loop_test(tests, not_computed_is_said, 0, 6);
    tcase_add_test(tests, nothing_at_the_elastic_peak);
    tcase_add_loop_test(tests, atomic_electrons_have_one_momentum, 0, 6);
    tcase_add_test(tests, bound_electrons_are_not_computed);
    tcase_add_test(tests, no_electron_comes_backwards);
    tcase_add_loop_test(tests, bad_input_is_refused, 0, 11);
    tcase_add_loop_test(tests, who_does_what, 0, 14);
    tcase_add_test(tests, registry);
    tcase_add_test(tests, slow_below_the_threshold);
    tcase_add_test(tests, rough_spectra_end);
    return run_suite("background", tests);
}
