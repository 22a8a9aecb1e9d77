/* test_migration.c - events between bins: against integrals, exact cases and a Monte Carlo. */
#include "beamhours/rates/migration.h"

#include <gsl/gsl_integration.h>
#include <math.h>
#include <string.h>

#include "../counter_random.h"
#include "../suite.h"

enum { MOST = 64 };

static void set_edges(double *edges, int cells, double from, double to)
{
    for (int i = 0; i <= cells; i++)
        edges[i] = from + (to - from) * i / cells;
}

static void move(const bh_migration *m, int from, double slope, double counts, double *measured)
{
    double share[MOST];
    bh_migration_column column = {.share = share};
    bh_migration_reach(m, NULL, from, slope, &column);
    for (int i = 0; i < column.count; i++)
        measured[column.first + i] += counts * share[i];
}

/* An exponential under a normal curve, the slow way. */
struct smeared {
    double slope, sigma, edge, centre;
};

static double smeared(double x, void *context)
{
    const struct smeared *s = context;
    return exp(s->slope * (x - s->centre)) * 0.5 * erfc((x - s->edge) / s->sigma / sqrt(2));
}

static double exact_below(double from, double to, double edge, double slope, double sigma)
{
    gsl_integration_workspace *w = gsl_integration_workspace_alloc(1000);
    struct smeared s = {slope, sigma, edge, (from + to) / 2};
    gsl_function f = {smeared, &s};
    double points[3] = {from, fmin(fmax(edge, from), to), to}, sum = 0, error;
    for (int i = 0; i < 2; i++) {
        double part = 0;
        if (points[i] < points[i + 1])
            gsl_integration_qag(&f, points[i], points[i + 1], 1e-14, 1e-10, 1000, 6, w, &part,
                                &error);
        sum += part;
    }
    gsl_integration_workspace_free(w);
    const double half = (to - from) / 2;
    return sum / (slope == 0 ? 2 * half : 2 * sinh(slope * half) / slope);
}

/* cell width 10 mrad; sigma [rad], slope [1/rad] */
static const struct {
    double sigma, slope;
} closed[] = {
    {3e-3, 0},     {3e-3, 1e-3}, {3e-3, -0.0099}, {3e-3, 0.0101}, {3e-3, -12}, {3e-3, 90},
    {1e-4, -12},   {1e-4, 2000}, {3e-2, -12},     {3e-2, 30},     {1e-6, -12}, {1e-2, 0.5},
    {1e-2, -0.02}, {1e-3, -500}, {0.3, 2},        {5e-5, 0},
};

START_TEST(columns_are_integrals)
{
    double edges[8], share[7], sum = 0;
    set_edges(edges, 7, 0.5, 0.57);
    const bh_migration m = {7, edges, closed[_i].sigma};
    ck_assert_int_eq(bh_migration_check(&m, NULL), BH_OK);
    bh_migration_shares(&m, 3, closed[_i].slope, share);
    for (int i = 0; i < 7; i++) {
        const double low =
            i == 0 ? 0
                   : exact_below(edges[3], edges[4], edges[i], closed[_i].slope, closed[_i].sigma);
        const double high = i == 6 ? 1
                                   : exact_below(edges[3], edges[4], edges[i + 1], closed[_i].slope,
                                                 closed[_i].sigma);
        ck_assert_msg(fabs(share[i] - (high - low)) < (closed[_i].sigma > 0.025 ? 6e-6 : 2e-9),
                      "sigma %g slope %g cell %d: %.12g, %.12g", closed[_i].sigma, closed[_i].slope,
                      i, share[i], high - low);
        ck_assert(share[i] >= 0);
        sum += share[i];
    }
    ck_assert_double_eq_tol(sum, 1, 1e-15);
}
END_TEST

/* Slopes of exponentials are found whatever the widths. */
START_TEST(slopes_of_exponentials)
{
    const double edges[] = {0.3, 0.31, 0.33, 0.335, 0.36, 0.4, 0.41};
    const double slopes[] = {0, -12, 40, -60};
    double counts[6], slope[6];
    const bh_migration m = {6, edges, 1e-3};
    for (int k = 0; k < COUNT(slopes); k++) {
        for (int i = 0; i < 6; i++)
            counts[i] = slopes[k] == 0 ? edges[i + 1] - edges[i]
                                       : (exp(slopes[k] * (edges[i + 1] - 0.35)) -
                                          exp(slopes[k] * (edges[i] - 0.35))) /
                                             slopes[k];
        bh_migration_slopes(&m, counts, slope);
        for (int i = 0; i < 6; i++)
            ck_assert_msg(fabs(slope[i] - slopes[k]) < 0.06 * fabs(slopes[k]) + 1e-9,
                          "slope %g in cell %d: %g", slopes[k], i, slope[i]);
    }
}
END_TEST

START_TEST(slopes_without_neighbours)
{
    const double edges[] = {0, 1, 2, 3, 4, 5};
    const double counts[] = {0, 3, 0, 2, 4};
    double slope[5];
    const bh_migration m = {5, edges, 0.1};
    bh_migration_slopes(&m, counts, slope);
    ck_assert(slope[0] == 0 && slope[1] == 0 && slope[2] == 0);
    ck_assert_double_eq_tol(slope[3], log(2), 1e-12);
    ck_assert_double_eq_tol(slope[4], log(2), 1e-12);
    const bh_migration one = {1, edges, 0.1};
    bh_migration_slopes(&one, counts + 1, slope);
    ck_assert(slope[0] == 0);
}
END_TEST

/* Whatever the counts, their sum stays; without resolution every count stays. */
START_TEST(counts_are_conserved)
{
    static const double sigmas[] = {0, 1e-9, 1e-5, 2e-3, 0.05, 3};
    double edges[MOST + 1], counts[MOST], slope[MOST], measured[MOST] = {0}, before = 0, after = 0;
    for (int i = 0; i <= MOST; i++)
        edges[i] = 0.2 + 0.01 * i + 0.004 * sin(i);
    const bh_migration m = {MOST, edges, sigmas[_i]};
    for (int i = 0; i < MOST; i++) {
        double u[2];
        even_pair(11, (uint64_t)i, 0, u);
        counts[i] = u[0] < 0.1 ? 0 : 1e6 * u[1] * u[1] * u[1];
        before += counts[i];
    }
    bh_migration_slopes(&m, counts, slope);
    for (int i = 0; i < MOST; i++)
        move(&m, i, slope[i], counts[i], measured);
    for (int i = 0; i < MOST; i++)
        after += measured[i];
    ck_assert_msg(fabs(after / before - 1) < 1e-14, "%.16g", after / before - 1);
    for (int i = 0; i < MOST && sigmas[_i] <= 1e-9; i++)
        ck_assert_double_eq_tol(measured[i], counts[i], 2e-6 * before / MOST);
}
END_TEST

/* Flow over an edge of a smooth density: sigma^2 / 2 times its derivative, to second order. */
START_TEST(narrow_resolutions_move_little)
{
    double edges[11], counts[10], slope[10], measured[10] = {0};
    const double sigma = 2e-4, power = -6;
    set_edges(edges, 10, 0.4, 0.6);
    const bh_migration m = {10, edges, sigma};
    for (int i = 0; i < 10; i++)
        counts[i] = (pow(edges[i + 1], power + 1) - pow(edges[i], power + 1)) / (power + 1);
    bh_migration_slopes(&m, counts, slope);
    for (int i = 0; i < 10; i++)
        move(&m, i, slope[i], counts[i], measured);
    double flow = 0;
    for (int i = 0; i < 9; i++) {
        flow += counts[i] - measured[i]; /* over edge i + 1, upwards */
        const double expected = -sigma * sigma / 2 * power * pow(edges[i + 1], power - 1);
        ck_assert_msg(fabs(flow - expected) < 2e-6 * counts[i], "edge %d: %g, %g of %g", i + 1,
                      flow, expected, counts[i]);
    }
}
END_TEST

/* Slopes of cells that are alike, and whether what they share is made use of. */
static const struct {
    double sigma, least, most; /* [rad] [1/rad] */
    bool alike;
} likenesses[] = {{3e-3, -40, -20, true}, {3e-3, 0, 0, true},    {3e-3, -15, 15, true},
                  {2e-4, -30, 30, true},  {2e-2, -9, -2, true},  {0.06, -2, 1, true},
                  {0.5, -1, 1, false},    {3e-3, -90, 30, false}};

/* Columns read between a few slopes are those of each slope, integrated by itself. */
START_TEST(cells_that_are_alike)
{
    enum { CELLS = 24 };
    double edges[CELLS + 1], slope[CELLS], share[2][CELLS];
    bh_migration_likeness likeness;
    set_edges(edges, CELLS, 0.4, 0.4 + 3e-3 * CELLS);
    const bh_migration m = {CELLS, edges, likenesses[_i].sigma};
    for (int i = 0; i < CELLS; i++)
        slope[i] = likenesses[_i].least +
                   (likenesses[_i].most - likenesses[_i].least) * ((i * 7) % CELLS) / (CELLS - 1.0);
    bh_migration_compare(&m, CELLS, slope, &likeness);
    ck_assert_int_eq(likeness.alike, likenesses[_i].alike);
    for (int i = 0; i < CELLS; i++) {
        bh_migration_column column[2] = {{.share = share[0]}, {.share = share[1]}};
        bh_migration_reach(&m, NULL, i, slope[i], &column[0]);
        bh_migration_reach(&m, &likeness, i, slope[i], &column[1]);
        ck_assert_int_eq(column[0].first, column[1].first);
        ck_assert_int_eq(column[0].count, column[1].count);
        double sum = 0;
        for (int n = 0; n < column[0].count; n++) {
            ck_assert_double_eq_tol(share[0][n], share[1][n], 1e-8);
            ck_assert_double_ge(share[1][n], 0);
            sum += share[1][n];
        }
        ck_assert_double_eq_tol(sum, 1, 1e-14);
    }
}
END_TEST

START_TEST(cells_that_differ)
{
    double edges[25], slope[24] = {0};
    bh_migration_likeness likeness;
    set_edges(edges, 24, 0.4, 0.5);
    edges[7] += 1e-6;
    bh_migration_compare(&(bh_migration){24, edges, 3e-3}, 24, slope, &likeness);
    ck_assert(!likeness.alike);
}
END_TEST

/* A steep density, smeared event by event: chi^2 of all bins for fixed seeds. */
START_TEST(as_a_monte_carlo_has_it)
{
    enum { EVENTS = 400000, CELLS = 12 };
    static const uint64_t seeds[] = {1, 20, 300};
    double edges[CELLS + 1], counts[CELLS], slope[CELLS], expected[CELLS] = {0}, found[CELLS] = {0};
    const double from = 0.35, to = 0.47, sigma = 6e-3, power = -7;
    set_edges(edges, CELLS, from, to);
    const bh_migration m = {CELLS, edges, sigma};
    const double p = power + 1, all = pow(to, p) - pow(from, p);
    for (int i = 0; i < CELLS; i++)
        counts[i] = EVENTS * (pow(edges[i + 1], p) - pow(edges[i], p)) / all;
    bh_migration_slopes(&m, counts, slope);
    for (int i = 0; i < CELLS; i++)
        move(&m, i, slope[i], counts[i], expected);
    for (uint64_t n = 0; n < EVENTS; n++) {
        double u[2];
        even_pair(seeds[_i], n, 0, u);
        const double truth = pow(pow(from, p) + u[0] * all, 1 / p);
        const double angle = truth + sigma * normal_deviate(seeds[_i], n, 1);
        const int cell = (int)floor((angle - from) / (to - from) * CELLS);
        found[cell < 0 ? 0 : cell >= CELLS ? CELLS - 1 : cell] += 1;
    }
    double chi2 = 0, moved = 0;
    for (int i = 0; i < CELLS; i++) {
        chi2 += (found[i] - expected[i]) * (found[i] - expected[i]) / expected[i];
        moved += (found[i] - counts[i]) * (found[i] - counts[i]) / counts[i];
    }
    /* 11 degrees of freedom: 31.3 has a probability of 0.001 */
    ck_assert_msg(chi2 < 31.3 && moved > 45, "seed %d: chi2 %g, without migration %g",
                  (int)seeds[_i], chi2, moved);
}
END_TEST

START_TEST(odd_ones_are_refused)
{
    const double rising[] = {0, 1, 2}, level[] = {0, 1, 1}, none[] = {0, (double)NAN, 2};
    const bh_migration odd[] = {
        {0, rising, 1},           {2, level, 1},        {2, none, 1}, {2, rising, -1},
        {2, rising, (double)NAN}, {2, rising, HUGE_VAL}};
    for (int i = 0; i < COUNT(odd); i++) {
        bh_error err = {.code = BH_OK};
        ck_assert_int_eq(bh_migration_check(&odd[i], &err), BH_EDOMAIN);
        ck_assert_ptr_nonnull(strstr(err.text, "resolution"));
    }
}
END_TEST

/* The generator is the published one: known answers of its authors' test vectors. */
START_TEST(random_numbers_are_known)
{
    const philox_block zeros = philox((philox_block){{0, 0, 0, 0}}, 0);
    ck_assert_uint_eq(zeros.word[0], 0x6627e8d5);
    ck_assert_uint_eq(zeros.word[1], 0xe169c58d);
    ck_assert_uint_eq(zeros.word[2], 0xbc57ac4c);
    ck_assert_uint_eq(zeros.word[3], 0x9b00dbd8);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("migration");
    tcase_add_loop_test(tests, columns_are_integrals, 0, COUNT(closed));
    tcase_add_loop_test(tests, cells_that_are_alike, 0, COUNT(likenesses));
    tcase_add_test(tests, cells_that_differ);
    tcase_add_test(tests, slopes_of_exponentials);
    tcase_add_test(tests, slopes_without_neighbours);
    tcase_add_loop_test(tests, counts_are_conserved, 0, 6);
    tcase_add_test(tests, narrow_resolutions_move_little);
    tcase_add_loop_test(tests, as_a_monte_carlo_has_it, 0, 3);
    tcase_add_test(tests, odd_ones_are_refused);
    tcase_add_test(tests, random_numbers_are_known);
    return run_suite("migration", tests);
}
