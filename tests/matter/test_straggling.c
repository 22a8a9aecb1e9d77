/* test_straggling.c - distributions of the energy loss, against printed and computed ones. */
#include "passing.h"

#include <gsl/gsl_randist.h>

#include "beamhours/matter/straggling.h"
#include "beamhours/matter/vavilov_modes.h"

/* ---- Landau ---- */

/* Computed independently from the definition. */
START_TEST(landau_density)
{
    const double rows[][2] = {{-2, 0.04398547838}, {-1, 0.1513919115}, {-0.222783, 0.1806556338},
                              {1, 0.1452066371},   {2, 0.1049129895},  {5, 0.03916341958}};
    for (int i = 0; i < COUNT(rows); i++)
        NEAR(bh_landau_density(rows[i][0]), rows[i][1], 1e-9, "phi(%g)", rows[i][0]);
    for (double l = -3.0; l < 500.0; l = l < 5.0 ? l + 0.1 : l * 1.2)
        NEAR(bh_landau_density(l), gsl_ran_landau_pdf(l), 3e-6,
             "phi(%g); Koelbig and Schorr, Comput. Phys. Commun. 31 (1984) 97", l);
}
END_TEST

START_TEST(landau_shape)
{
    const double top = 0.1806556338;
    ck_assert_double_lt(bh_landau_density(-0.2237829679), top);
    ck_assert_double_lt(bh_landau_density(-0.2217829679), top);
    NEAR(bh_landau_density(-1.586532956), 0.5 * top, 1e-8, "lower half height");
    NEAR(bh_landau_density(2.432112756), 0.5 * top, 1e-8, "upper half height");
}
END_TEST

START_TEST(landau_beyond)
{
    double before = 1.0;
    for (double l = -3.8; l < 1e6; l = l < 5.0 ? l + 0.2 : l * 1.5) {
        const double h = 1e-3 * fmax(fabs(l), 0.1);
        const double beyond = bh_landau_beyond(l);
        ck_assert_msg(beyond <= before, "rises at %g", l);
        const double slope = (bh_landau_beyond(l - h) - bh_landau_beyond(l + h)) / (2.0 * h);
        ck_assert_msg(fabs(slope - bh_landau_density(l)) < 2e-6, "derivative at %g", l);
        if (l > 300.0) /* one collision of that size, the others losing their usual ln lambda */
            NEAR(beyond, 1.0 / (l - log(l)), 0.01, "tail at %g", l);
        before = beyond;
    }
    ck_assert_double_eq(bh_landau_beyond(-5.0), 1.0);
    ck_assert_double_eq(bh_landau_density(-5.0), 0.0);
    ck_assert(isnan(bh_landau_beyond((double)NAN)) && isnan(bh_landau_density((double)NAN)));
}
END_TEST

/* ---- Vavilov ---- */

/* Mean gamma - 1 - beta^2 - ln kappa and variance (1 - beta^2 / 2) / kappa, from sums of the
 * distribution beyond. */
START_TEST(vavilov_moments)
{
    for (double kappa = 0.1; kappa < 12.0; kappa *= 9.0)
        for (double beta2 = 0.0; beta2 <= 1.0; beta2 += 0.5) {
            const bh_vavilov v = {kappa, beta2};
            const double mean = 0.5772156649 - 1.0 - beta2 - log(kappa);
            const double variance = (1.0 - 0.5 * beta2) / kappa;
            const double width = sqrt(variance);
            const double step = 0.02 * width;
            const double low = fmax(mean - 8.0 * width, -5.0);
            const double high = mean + 12.0 * width + 2.0 / kappa;
            double first = low;
            double second = low * low;
            for (double l = low + 0.5 * step; l < high; l += step) {
                const double beyond = bh_vavilov_beyond(v, l);
                first += beyond * step;
                second += 2.0 * l * beyond * step;
            }
            ck_assert_msg(fabs(first - mean) < 2e-3 * width, "mean at %g, %g: %g, not %g", kappa,
                          beta2, first, mean);
            NEAR(second - first * first, variance, 5e-3, "variance at %g, %g", kappa, beta2);
        }
}
END_TEST

/* Without spin a largest transfer only takes away those with a larger one, exp(-kappa) of all are
 * left: until lambda is of the size of 1 / kappa. */
START_TEST(vavilov_is_landau_when_thin)
{
    for (double l = -2.5; l < 40.0; l += 1.3) {
        const bh_vavilov v = {0.01, 0.0};
        NEAR(bh_vavilov_density(v, l), exp(v.kappa) * bh_landau_density(l), 2e-5, "at %g", l);
        ck_assert_msg(fabs(bh_vavilov_beyond(v, l) - bh_landau_beyond(l)) < 1.05e-2, "at %g", l);
    }
}
END_TEST

START_TEST(vavilov_derivative)
{
    const bh_vavilov v = {0.3, 0.6};
    for (double l = -3.0; l < 12.0; l += 0.7) {
        const double slope =
            (bh_vavilov_beyond(v, l - 1e-3) - bh_vavilov_beyond(v, l + 1e-3)) / 2e-3;
        ck_assert_msg(fabs(slope - bh_vavilov_density(v, l)) < 1e-6, "at %g", l);
    }
    ck_assert_double_lt(bh_vavilov_beyond(v, 60.0), 1e-7);
    ck_assert_double_gt(bh_vavilov_beyond(v, -60.0), 1.0 - 1e-7);
    ck_assert(isnan(bh_vavilov_beyond(v, (double)NAN)) &&
              isnan(bh_vavilov_density(v, (double)NAN)));
}
END_TEST

/* The table of maxima and widths, against the density. */
START_TEST(vavilov_maxima)
{
    for (int i = 0; i < BH_VAVILOV_KAPPAS; i += 4)
        for (int j = 0; j < BH_VAVILOV_BETAS; j += 2) {
            const bh_vavilov v = {pow(10.0, -2.0 + i / 8.0), j / 4.0};
            const bh_vavilov_mode *m = &bh_vavilov_modes[i][j];
            const double top = bh_vavilov_density(v, m->mode);
            const double step = 0.02 * m->width;
            ck_assert_msg(top >= bh_vavilov_density(v, m->mode - step) - 1e-9 &&
                              top >= bh_vavilov_density(v, m->mode + step) - 1e-9,
                          "kappa %g, beta^2 %g", v.kappa, v.beta2);
            double inside = m->mode;
            double outside = m->mode - 1.2 * m->width;
            for (int k = 0; k < 40; k++) {
                const double middle = 0.5 * (inside + outside);
                *(bh_vavilov_density(v, middle) > 0.5 * top ? &inside : &outside) = middle;
            }
            ck_assert_msg(fabs(bh_vavilov_density(v, inside + m->width) / top - 0.5) < 1e-3,
                          "width at kappa %g, beta^2 %g", v.kappa, v.beta2);
        }
}
END_TEST

/* ---- layers ---- */

/* Silicon, a particle of charge 1 with beta gamma 3.5778 (pion of 500 MeV/c): computed
 * independently; Bichsel, Rev. Mod. Phys. 60 (1988) 663, j = 0.200. */
START_TEST(silicon)
{
    const struct {
        double thickness;                /* um */
        double xi, probable, fwhm, mean; /* keV */
    } rows[] = {{80, 1.53741, 18.8709, 6.1773, 31.0075},
                {300, 5.76528, 78.3864, 23.1649, 116.278},
                {320, 6.14963, 84.009, 24.7092, 124.03},
                {640, 12.2993, 176.543, 49.4184, 248.06}};
    const bh_medium m = medium_of("silicon");
    bh_particle p = particle_of("pion+");
    p.mass = 139.57; /* that of the computation */
    const double kinetic = hypot(500.0, p.mass) - p.mass;
    for (int i = 0; i < COUNT(rows); i++) {
        bh_straggling s;
        ck_assert_int_eq(bh_straggling_of(&p, &m, kinetic, rows[i].thickness * 1e-4 * 2.329, &s),
                         BH_OK);
        ck_assert_int_eq(s.law, BH_STRAGGLING_LANDAU);
        NEAR(s.xi * 1e3, rows[i].xi, 5e-4, "xi of %g um", rows[i].thickness);
        NEAR(s.most_probable * 1e3, rows[i].probable, 1e-3, "most probable of %g um",
             rows[i].thickness);
        NEAR(s.fwhm * 1e3, rows[i].fwhm, 5e-4, "width of %g um", rows[i].thickness);
        NEAR(s.mean * 1e3, rows[i].mean, 2e-3, "mean of %g um", rows[i].thickness);
    }
}
END_TEST

/* Protons of 100 MeV in 1 g/cm2 of water: computed independently. */
START_TEST(water)
{
    const bh_medium m = medium_of("water");
    const bh_particle p = particle_of("proton");
    bh_straggling s;
    ck_assert_int_eq(bh_straggling_of(&p, &m, 100.0, 1.0, &s), BH_OK);
    ck_assert_int_eq(s.law, BH_STRAGGLING_VAVILOV);
    NEAR(s.sigma * 1e3, 311.0678282, 1e-3, "sigma");
    NEAR(s.kappa, 2.02823346, 1e-3, "kappa");
    ck_assert_double_lt(s.most_probable, s.mean);
    NEAR(s.fwhm, 2.3548 * s.sigma, 0.05, "nearly a normal distribution");
}
END_TEST

/* One law hands over to the next without a step. */
START_TEST(laws_meet)
{
    const bh_medium m = medium_of("silicon");
    const bh_particle p = particle_of("proton");
    bh_straggling last = {.kappa = 0.0};
    for (double path = 1e-4; path < 30.0; path *= 1.01) {
        bh_straggling s;
        ck_assert_int_eq(bh_straggling_of(&p, &m, 150.0, path, &s), BH_OK);
        if (last.kappa > 0.0) {
            const double tolerance = last.law == s.law ? 0.025 : 0.04;
            NEAR(s.fwhm, last.fwhm, tolerance, "kappa %g", s.kappa);
            ck_assert_msg(s.law >= last.law && s.most_probable > last.most_probable, "kappa %g",
                          s.kappa);
        }
        last = s;
    }
    ck_assert_int_eq(last.law, BH_STRAGGLING_NORMAL);
}
END_TEST

START_TEST(beyond_a_cut)
{
    const bh_medium m = medium_of("silicon");
    const bh_particle p = particle_of("proton");
    const double paths[] = {1e-3, 0.1, 25.0};
    for (int i = 0; i < COUNT(paths); i++) {
        bh_straggling s;
        ck_assert_int_eq(bh_straggling_of(&p, &m, 150.0, paths[i], &s), BH_OK);
        ck_assert_int_eq(s.law, i);
        double before = 1.0;
        for (double loss = 0.0; loss < s.mean + 20.0 * s.fwhm; loss += 0.3 * s.fwhm) {
            const double beyond = bh_straggling_beyond(&s, loss);
            ck_assert_msg(beyond <= before + 1e-9 && beyond >= 0.0, "at %g", loss);
            before = beyond;
        }
        const double half = bh_straggling_beyond(&s, s.most_probable);
        ck_assert_msg(half > 0.45 && half < 0.8, "%g", half);
    }
}
END_TEST

/* xi / loss for losses far above: what bremsstrahlung.h uses. */
START_TEST(electron_tail)
{
    const bh_medium m = medium_of("liquid-hydrogen");
    const bh_particle e = particle_of("electron");
    bh_straggling s;
    ck_assert_int_eq(bh_straggling_of(&e, &m, 855.0, 0.7, &s), BH_OK);
    ck_assert_int_eq(s.law, BH_STRAGGLING_LANDAU);
    NEAR(bh_straggling_beyond(&s, 20.0 + s.most_probable), s.xi / 20.0, 0.05, "tail");
    ck_assert_double_gt(s.mean, s.most_probable);
}
END_TEST

START_TEST(what_is_refused)
{
    const bh_medium m = medium_of("silicon");
    const bh_particle p = particle_of("proton");
    bh_straggling s;
    const double wrong[] = {0.0, -1.0, (double)NAN, (double)INFINITY};
    for (int i = 0; i < COUNT(wrong); i++) {
        ck_assert_int_eq(bh_straggling_of(&p, &m, wrong[i], 1.0, &s), BH_EDOMAIN);
        ck_assert_int_eq(bh_straggling_of(&p, &m, 1.0, wrong[i], &s), BH_EDOMAIN);
    }
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("straggling");
    tcase_add_checked_fixture(t, open_library, close_library);
    tcase_set_timeout(t, 120);
    tcase_add_test(t, landau_density);
    tcase_add_test(t, landau_shape);
    tcase_add_test(t, landau_beyond);
    tcase_add_test(t, vavilov_moments);
    tcase_add_test(t, vavilov_is_landau_when_thin);
    tcase_add_test(t, vavilov_derivative);
    tcase_add_test(t, vavilov_maxima);
    tcase_add_test(t, silicon);
    tcase_add_test(t, water);
    tcase_add_test(t, laws_meet);
    tcase_add_test(t, beyond_a_cut);
    tcase_add_test(t, electron_tail);
    tcase_add_test(t, what_is_refused);
    return run_suite("straggling", t);
}
