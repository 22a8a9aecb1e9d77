/* test_range.c - ranges, and energies after a path. */
#include "passing.h"

#include "beamhours/matter/range.h"
#include "beamhours/units/constants.h"

static bh_stopping *stopping;
static bh_range *range;

static void prepare(const char *particle, const char *material, double kinetic)
{
    stopping = stopping_of(particle, material);
    bh_error err;
    ck_assert_msg(bh_range_new(stopping, BH_LOSE_COLLISION, kinetic, &range, &err) == BH_OK, "%s",
                  err.text);
}

static void drop(void)
{
    bh_range_free(range);
    bh_stopping_free(stopping);
}

static const struct {
    const char *particle, *material;
    double kinetic; /* MeV */
} cases[] = {{"proton", "water", 250.0},
             {"proton", "gold", 30.0},
             {"alpha", "silicon", 9.0},
             {"electron", "copper", 855.0},
             {"positron", "liquid-hydrogen", 4000.0},
             {"muon-", "lead", 115.0},
             {"12C", "graphite", 1200.0},
             {"pion+", "hydrogen-gas", 400.0}};

/* ---- published ---- */

/* CSDA ranges of PSTAR, ASTAR, ESTAR (ICRU Reports 49 and 37), from memory; electrons with
 * radiation. */
START_TEST(published)
{
    const struct {
        const char *particle, *material;
        double kinetic, range, tolerance;
        bh_losing losing;
    } rows[] = {{"proton", "water", 100.0, 7.718, 0.002, BH_LOSE_COLLISION},
                {"proton", "water", 10.0, 0.1230, 0.004, BH_LOSE_COLLISION},
                {"proton", "water", 200.0, 25.96, 0.002, BH_LOSE_COLLISION},
                {"proton", "aluminium", 100.0, 10.01, 0.004, BH_LOSE_COLLISION},
                {"alpha", "air", 5.5, 0.00492, 0.04, BH_LOSE_COLLISION},
                {"electron", "water", 10.0, 4.975, 0.005, BH_LOSE_ALL},
                {"electron", "aluminium", 1.0, 0.5546, 0.008, BH_LOSE_ALL}};
    for (int i = 0; i < COUNT(rows); i++) {
        bh_error err;
        stopping = stopping_of(rows[i].particle, rows[i].material);
        ck_assert_int_eq(bh_range_new(stopping, rows[i].losing, rows[i].kinetic, &range, &err),
                         BH_OK);
        NEAR(bh_range_of(range, rows[i].kinetic), rows[i].range, rows[i].tolerance,
             "%s of %g MeV in %s; PSTAR, ASTAR, ESTAR (from memory)", rows[i].particle,
             rows[i].kinetic, rows[i].material);
        ck_assert_double_eq(bh_range_top(range), rows[i].kinetic);
        ck_assert_ptr_eq(bh_range_stopping(range), stopping);
        drop();
    }
}
END_TEST

/* ---- laws ---- */

/* A classical Runge-Kutta of dE/dx over the path in many steps. */
static double followed(double kinetic, double path, int steps)
{
    const double h = path / steps;
    double e = kinetic;
    for (int i = 0; i < steps; i++) {
        const double k1 = bh_stopping_at(stopping, e).collision;
        const double k2 = bh_stopping_at(stopping, e - 0.5 * h * k1).collision;
        const double k3 = bh_stopping_at(stopping, e - 0.5 * h * k2).collision;
        const double k4 = bh_stopping_at(stopping, e - h * k3).collision;
        e -= h / 6.0 * (k1 + 2.0 * k2 + 2.0 * k3 + k4);
    }
    return e;
}

START_TEST(solves_the_equation)
{
    for (int i = 0; i < COUNT(cases); i++) {
        prepare(cases[i].particle, cases[i].material, cases[i].kinetic);
        const double e0 = 0.98 * cases[i].kinetic;
        const double whole = bh_range_of(range, e0);
        for (double part = 1e-6; part < 0.95; part *= 3.0) {
            const double wanted = e0 - followed(e0, part * whole, 2000);
            NEAR(bh_range_lost(range, e0, part * whole), wanted, 1e-5, "%s in %s, %g of the range",
                 cases[i].particle, cases[i].material, part);
        }
        drop();
    }
}
END_TEST

START_TEST(thin_layers_lose_as_stopping_says)
{
    for (int i = 0; i < COUNT(cases); i++) {
        prepare(cases[i].particle, cases[i].material, cases[i].kinetic);
        for (double e = cases[i].kinetic; e > 0.05; e *= 0.83) {
            const double path = 1e-7 * bh_range_of(range, e);
            NEAR(bh_range_lost(range, e, path), path * bh_stopping_at(stopping, e).collision, 1e-5,
                 "%s of %g MeV in %s", cases[i].particle, e, cases[i].material);
        }
        drop();
    }
}
END_TEST

START_TEST(splitting_changes_nothing)
{
    for (int i = 0; i < COUNT(cases); i++) {
        prepare(cases[i].particle, cases[i].material, cases[i].kinetic);
        const double path = 0.6 * bh_range_of(range, cases[i].kinetic);
        const double once = bh_range_after(range, cases[i].kinetic, path);
        for (int pieces = 2; pieces <= 1024; pieces *= 4) {
            double e = cases[i].kinetic;
            double lost = 0.0;
            for (int k = 0; k < pieces; k++) {
                lost += bh_range_lost(range, e, path / pieces);
                e = bh_range_after(range, e, path / pieces);
            }
            NEAR(e, once, 1e-9, "%s in %s, %d pieces", cases[i].particle, cases[i].material,
                 pieces);
            NEAR(lost + e, cases[i].kinetic, 1e-9, "energy conserved");
        }
        drop();
    }
}
END_TEST

START_TEST(range_and_energy_are_inverse_and_rise)
{
    for (int i = 0; i < COUNT(cases); i++) {
        prepare(cases[i].particle, cases[i].material, cases[i].kinetic);
        double before = 0.0;
        for (double e = 1e-5; e < cases[i].kinetic; e *= 1.03) {
            const double r = bh_range_of(range, e);
            ck_assert_msg(r > before, "%s at %g", cases[i].particle, e);
            NEAR(bh_range_energy(range, r), e, 1e-10, "%s at %g", cases[i].particle, e);
            before = r;
        }
        drop();
    }
}
END_TEST

START_TEST(backwards)
{
    prepare("proton", "water", 200.0);
    const double left = bh_range_after(range, 150.0, 3.0);
    NEAR(bh_range_after(range, left, -3.0), 150.0, 1e-10, "and back");
    ck_assert(isnan(bh_range_after(range, 199.0, -5.0)));
    drop();
}
END_TEST

START_TEST(radiation_shortens)
{
    bh_range *all = NULL;
    prepare("electron", "tungsten", 500.0);
    ck_assert_int_eq(bh_range_new(stopping, BH_LOSE_ALL, 500.0, &all, NULL), BH_OK);
    ck_assert_double_lt(bh_range_of(all, 500.0), 0.2 * bh_range_of(range, 500.0));
    bh_range_free(all);
    drop();
}
END_TEST

START_TEST(ends)
{
    bh_error err;
    prepare("proton", "copper", 10.0);
    const double whole = bh_range_of(range, 10.0);
    ck_assert_double_eq(bh_range_after(range, 10.0, whole * 1.01), 0.0);
    ck_assert_double_eq(bh_range_lost(range, 10.0, whole * 1.01), 10.0);
    ck_assert_double_eq(bh_range_of(range, 0.0), 0.0);
    ck_assert_double_eq(bh_range_energy(range, 0.0), 0.0);
    ck_assert_double_eq(bh_range_energy(range, -1.0), 0.0);
    ck_assert_double_eq(bh_range_after(range, 5.0, 0.0), 5.0);
    ck_assert_double_eq(bh_range_lost(range, 5.0, 0.0), 0.0);
    ck_assert_double_eq(bh_range_energy(range, whole), 10.0);
    const double outside[] = {-1.0, 10.001, (double)NAN};
    for (int i = 0; i < COUNT(outside); i++) {
        ck_assert(isnan(bh_range_of(range, outside[i])));
        ck_assert(isnan(bh_range_after(range, outside[i], 0.1)));
        ck_assert(isnan(bh_range_lost(range, outside[i], 0.1)));
    }
    ck_assert(isnan(bh_range_energy(range, 2.0 * whole)));
    ck_assert(isnan(bh_range_lost(range, 5.0, -0.1)));
    ck_assert(isnan(bh_range_after(range, 5.0, (double)NAN)));
    bh_range *none = NULL;
    const double refused[] = {0.0, 5e-4, 1.1e7, (double)NAN};
    for (int i = 0; i < COUNT(refused); i++)
        ck_assert_int_eq(bh_range_new(stopping, BH_LOSE_ALL, refused[i], &none, &err), BH_EDOMAIN);
    ck_assert_ptr_null(none);
    ck_assert_ptr_nonnull(strstr(err.text, "proton"));
    bh_range_free(NULL);
    drop();
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("range");
    tcase_add_checked_fixture(t, open_library, close_library);
    tcase_set_timeout(t, 60);
    tcase_add_test(t, published);
    tcase_add_test(t, solves_the_equation);
    tcase_add_test(t, thin_layers_lose_as_stopping_says);
    tcase_add_test(t, splitting_changes_nothing);
    tcase_add_test(t, range_and_energy_are_inverse_and_rise);
    tcase_add_test(t, backwards);
    tcase_add_test(t, radiation_shortens);
    tcase_add_test(t, ends);
    return run_suite("range", t);
}
