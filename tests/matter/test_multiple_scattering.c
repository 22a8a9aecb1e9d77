/* test_multiple_scattering.c - widths and tails of the angle. */
#include "passing.h"

#include <gsl/gsl_sf_bessel.h>

#include "beamhours/matter/multiple_scattering.h"
#include "beamhours/matter/radiation_length.h"
#include "beamhours/units/constants.h"

static double kinetic_of(const bh_particle *p, double momentum)
{
    return hypot(momentum, p->mass) - p->mass;
}

/* Computed independently; Particle Data Group, and Lynch and Dahl, Nucl. Instr. Meth. B 58 (1991)
 * 6; 0.157 MeV^2 cm2/g is rounded there. */
START_TEST(widths)
{
    const struct {
        const char *material;
        double momentum, path, length; /* MeV/c, g/cm2, radiation lengths; 0: that of the path */
        double highland, width, collisions;
    } rows[] = {{"aluminium", 1000.0, 0.240112, 0.01, 1.122004805e-3, 1.134703938e-3, 2224.725924},
                {"liquid-hydrogen", 500.0, 1.446, 1.446 / 63.04722, 3.528352996e-3, 3.353685419e-3,
                 22439.48058}};
    const bh_particle e = particle_of("electron");
    for (int i = 0; i < COUNT(rows); i++) {
        const bh_medium m = medium_of(rows[i].material);
        const double kinetic = kinetic_of(&e, rows[i].momentum);
        NEAR(bh_highland(&e, kinetic, rows[i].length), rows[i].highland, 1e-4, "Highland, %s",
             rows[i].material);
        bh_moliere sum = {0.0, 0.0};
        bh_moliere_add(&sum, &e, &m, (bh_crossing){kinetic, rows[i].path});
        NEAR(bh_moliere_width(&sum, 0.98), rows[i].width, 1e-3, "Lynch and Dahl, %s",
             rows[i].material);
        NEAR(bh_moliere_collisions(&sum), rows[i].collisions, 2e-3, "collisions, %s",
             rows[i].material);
    }
}
END_TEST

/* Moliere's function by its own integral, without the expansion in 1/B: Bethe, Phys. Rev. 89 (1953)
 * 1256, eq. 12, over y = chi_c times the conjugate of the angle. */
static double transformed(const bh_moliere *m, double angle)
{
    const double b = log(bh_moliere_collisions(m) / 1.167);
    const double reduced = angle / sqrt(m->chi_c2);
    /* where the exponent turns the theory has nothing more to say, and nothing is left */
    const double end = fmin(2.0 * exp(0.5 * (b - 1.0)), 40.0);
    const int steps = 200000;
    double sum = 0.0;
    for (int i = 0; i < steps; i++) {
        const double y = end * (i + 0.5) / steps;
        const double q = 0.25 * y * y;
        sum += gsl_sf_bessel_J1(reduced * y) * exp(q * (log(q) - b)) * end / steps;
    }
    return 1.0 - reduced * sum;
}

START_TEST(moliere_against_his_integral)
{
    const bh_medium m = medium_of("copper");
    const bh_particle p = particle_of("proton");
    const double paths[] = {0.002, 0.02, 0.5};
    for (int i = 0; i < COUNT(paths); i++) {
        bh_moliere sum = {0.0, 0.0};
        bh_moliere_add(&sum, &p, &m, (bh_crossing){100.0, paths[i]});
        ck_assert_double_gt(bh_moliere_collisions(&sum), 20.0);
        const double width = bh_moliere_width(&sum, 0.98);
        for (double part = 0.1; part < 12.0; part *= 1.35) {
            const double want = transformed(&sum, part * width);
            ck_assert_msg(fabs(bh_moliere_beyond(&sum, part * width) - want) < 0.01 * want + 2e-5,
                          "%g g/cm2 at %g widths: %g, not %g", paths[i], part,
                          bh_moliere_beyond(&sum, part * width), want);
        }
    }
}
END_TEST

/* In between: almost a normal distribution of Highland's width; far out: Rutherford. */
START_TEST(limits)
{
    const bh_material lead = material_of("lead");
    const bh_medium m = medium_of("lead");
    const bh_particle e = particle_of("electron");
    const double path = 0.3;
    bh_moliere sum = {0.0, 0.0};
    bh_moliere_add(&sum, &e, &m, (bh_crossing){500.0, path});
    const double width = bh_highland(&e, 500.0, path / bh_radiation_length_of(&lead).computed);
    NEAR(bh_moliere_width(&sum, 0.98), width, 0.11, "Highland to his 11 %%");
    NEAR(bh_moliere_beyond(&sum, width), exp(-0.5), 0.08, "one width");
    const double far = 40.0 * width;
    NEAR(bh_moliere_beyond(&sum, far), sum.chi_c2 / (far * far), 0.02, "single scattering");
    ck_assert_double_eq(bh_moliere_beyond(&sum, 0.0), 1.0);
}
END_TEST

START_TEST(falls_with_the_angle)
{
    const bh_medium m = medium_of("carbon-dioxide");
    const bh_particle a = particle_of("alpha");
    for (double path = 1e-9; path < 1e-2; path *= 10.0) {
        bh_moliere sum = {0.0, 0.0};
        bh_moliere_add(&sum, &a, &m, (bh_crossing){8.0, path});
        double before = 1.0;
        for (double angle = 1e-5; angle < 1.0; angle *= 1.1) {
            const double beyond = bh_moliere_beyond(&sum, angle);
            ck_assert_msg(beyond <= before + 1e-4 && beyond >= 0.0, "%g g/cm2 at %g", path, angle);
            before = beyond;
        }
    }
}
END_TEST

/* Layers in any order and number: the sums add, the widths do not. */
START_TEST(layers_add)
{
    const bh_medium m = medium_of("mylar");
    const bh_particle e = particle_of("electron");
    bh_moliere once = {0.0, 0.0};
    bh_moliere twice = {0.0, 0.0};
    bh_moliere_add(&once, &e, &m, (bh_crossing){100.0, 0.02});
    for (int i = 0; i < 10; i++)
        bh_moliere_add(&twice, &e, &m, (bh_crossing){100.0, 0.002});
    NEAR(bh_moliere_beyond(&twice, 0.02), bh_moliere_beyond(&once, 0.02), 1e-10, "ten layers");
    const double whole = bh_highland(&e, 100.0, 0.01);
    const double tenth = bh_highland(&e, 100.0, 0.001);
    ck_assert_double_gt(whole, 1.05 * sqrt(10.0) * tenth);
}
END_TEST

START_TEST(odd_input)
{
    const bh_medium m = medium_of("mylar");
    const bh_particle e = particle_of("electron");
    bh_moliere none = {0.0, 0.0};
    bh_moliere_add(&none, &e, &m, (bh_crossing){0.0, 1.0});
    bh_moliere_add(&none, &e, &m, (bh_crossing){1.0, -1.0});
    bh_moliere_add(&none, &e, &m, (bh_crossing){1.0, (double)NAN});
    ck_assert_double_eq(none.chi_c2, 0.0);
    ck_assert_double_eq(bh_moliere_collisions(&none), 0.0);
    ck_assert_double_eq(bh_moliere_width(&none, 0.98), 0.0);
    ck_assert_double_eq(bh_moliere_beyond(&none, 0.0), 1.0);
    ck_assert_double_eq(bh_moliere_beyond(&none, 0.1), 0.0);
    ck_assert(isnan(bh_moliere_beyond(&none, -0.1)) && isnan(bh_moliere_width(&none, 1.0)));
    ck_assert_double_eq(bh_highland(&e, 100.0, 0.0), 0.0);
    ck_assert_double_eq(bh_highland(&e, 100.0, 1e-13), 0.0); /* where the logarithm wins */
    ck_assert(isnan(bh_highland(&e, 0.0, 0.1)) && isnan(bh_highland(&e, 1.0, -0.1)));
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("multiple scattering");
    tcase_add_checked_fixture(t, open_library, close_library);
    tcase_set_timeout(t, 60);
    tcase_add_test(t, widths);
    tcase_add_test(t, moliere_against_his_integral);
    tcase_add_test(t, limits);
    tcase_add_test(t, falls_with_the_angle);
    tcase_add_test(t, layers_add);
    tcase_add_test(t, odd_input);
    return run_suite("multiple scattering", t);
}
