/* test_pair.c - two arms in coincidence: against one arm alone, and events drawn one by one. */
#include "../counter_random.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/run/columns.h"
#include "beamhours/units/constants.h"
#include "evaluated.h"

/* Arms A (electrons, right) and B (protons, left), a coincidence of both; %s: more of each. */
static struct evaluated pair_with(const char *a, const char *b, const char *setting)
{
    char text[2048];
    snprintf(
        text, sizeof text,
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 uA}\n"
        "target: {scatterer: H, layers: [{material: aluminium, thickness: 0.1 mm, role: window},"
        " {material: liquid-hydrogen, thickness: 20 mm}]}\n"
        "models: {energy_loss: none}\n"
        "arms:\n  - {name: A, bins: 4%s}\n  - {name: B, side: left, detects: recoil%s}\n"
        "settings:\n  - {name: K, arms: [{arm: A, angle: 40 deg}, {arm: B, angle: conjugate}], "
        "coincidence: {arms: [A, B], window: 30 ns}%s}\n",
        a, b, setting);
    return evaluate(text);
}

#define A_USUAL ", in_plane: ±28 mrad, out_of_plane: ±70 mrad"
#define B_LARGE ", in_plane: ±200 mrad, out_of_plane: ±300 mrad"
#define B_SMALL ", in_plane: ±30 mrad, out_of_plane: ±40 mrad"

enum { ROW_A, ROW_B, ROW_PAIR };

START_TEST(a_row_of_its_own)
{
    struct evaluated e = pair_with(A_USUAL, B_LARGE, ", goal: 1 %");
    ck_assert_uint_eq(bh_table_rows(e.table, false), 3);
    ck_assert_uint_eq(bh_table_rows(e.table, true), 4 + 1 + 4);
    ck_assert_str_eq(bh_table_text(e.table, false, ROW_PAIR, BH_COL_ARM), "A+B");
    ck_assert_uint_eq(bh_diags_count(e.diags), 0);
    /* the setting's goal is the pair's alone */
    ck_assert(isnan(cell(&e, ROW_A, BH_COL_HOURS_TO_GOAL)));
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_HOURS), cell(&e, ROW_PAIR, BH_COL_HOURS_TO_GOAL),
                       1e-12, "hours");
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_STATISTICAL), 0.01, 1e-9, "goal");
    done(&e);
}
END_TEST

/* A second arm that takes every partner leaves the first as it is. */
START_TEST(a_large_second_arm)
{
    struct evaluated e = pair_with(A_USUAL ", momentum_bite: ±1 %, momentum_resolution: 0.2 %, "
                                           "angle_resolution: 3 mrad, efficiency: 95 %",
                                   B_LARGE ", efficiency: 80 %", "");
    static const bh_column_id same[] = {BH_COL_CROSS_SECTION,      BH_COL_SOLID_ANGLE,  BH_COL_KEPT,
                                        BH_COL_PER_MRAD,           BH_COL_PER_PERMILLE, BH_COL_SEEN,
                                        BH_COL_POINT_CROSS_SECTION};
    for (int k = 0; k < COUNT(same); k++) {
        const double tolerance = k == 3 || k == 4 ? 1e-4 : 2e-6;
        ck_assert_relative(cell(&e, ROW_PAIR, same[k]), cell(&e, ROW_A, same[k]), tolerance,
                           bh_column_at((int)same[k])->key);
        for (size_t i = 0; i < 4; i++)
            ck_assert_relative(bin_cell(&e, 5 + i, same[k]), bin_cell(&e, i, same[k]), tolerance,
                               bh_column_at((int)same[k])->key);
    }
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_EFFICIENCY), 0.76, 1e-12, "efficiency");
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_SIGNAL), 0.8 * cell(&e, ROW_A, BH_COL_SIGNAL),
                       1e-6, "signal");
    done(&e);
}
END_TEST

/* luminosity x 1e-30 x cross section x solid angle x kept x efficiency */
static double product(const struct evaluated *e, size_t row)
{
    return cell(e, row, BH_COL_LUMINOSITY) * 1e-30 * cell(e, row, BH_COL_CROSS_SECTION) *
           cell(e, row, BH_COL_SOLID_ANGLE) * 1e-3 * cell(e, row, BH_COL_RADIATIVE) *
           cell(e, row, BH_COL_KEPT) * cell(e, row, BH_COL_EFFICIENCY);
}

START_TEST(rows_multiply_out)
{
    struct evaluated e =
        pair_with(A_USUAL ", momentum_bite: ±1 %", B_SMALL ", threshold: 100 MeV", "");
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_SIGNAL), product(&e, ROW_PAIR), 1e-12, "signal");
    ck_assert_double_lt(cell(&e, ROW_PAIR, BH_COL_SOLID_ANGLE),
                        0.7 * cell(&e, ROW_A, BH_COL_SOLID_ANGLE));
    double bins = 0;
    for (size_t i = 0; i < 4; i++)
        bins += bin_cell(&e, 5 + i, BH_COL_SIGNAL);
    ck_assert_relative(bins, cell(&e, ROW_PAIR, BH_COL_SIGNAL), 1e-5, "bins");
    done(&e);
}
END_TEST

/* The joint part of the first arm, drawn: electrons on the right, protons on the left. */
START_TEST(as_events_drawn)
{
    enum { EVENTS = 400000 };
    static const uint64_t seeds[] = {2, 22, 222};
    const uint64_t seed = seeds[_i];
    struct evaluated e = pair_with(A_USUAL, B_SMALL ", threshold: 151 MeV", "");
    const double axis = 40 * BH_DEGREE;
    const double angle = cell(&e, ROW_B, BH_COL_ANGLE) * BH_DEGREE;
    const bh_collision in = {BH_MASS_ELECTRON, BH_MASS_PROTON, 855};
    double joint = 0, kept = 0, all = 0;
    for (uint64_t n = 0; n < EVENTS; n++) {
        double u[2];
        even_pair(seed, n, 0, u);
        const double flat = 0.028 * (2 * u[0] - 1), up = asin(sin(0.07) * (2 * u[1] - 1));
        const double v[3] = {-cos(up) * sin(axis + flat), sin(up), cos(up) * cos(axis + flat)};
        bh_event event;
        ck_assert_int_eq(bh_kinematics_scattered(&in, acos(v[2]), BH_BRANCH_FAST, &event, NULL),
                         BH_OK);
        const double across = hypot(v[0], v[1]), s = sin(event.recoil_angle) / across;
        const double w[3] = {-v[0] * s, -v[1] * s, cos(event.recoil_angle)};
        const bool both = fabs(atan2(w[0], w[2]) - angle) < 0.03 && fabs(asin(w[1])) < 0.04;
        const double weight = pow(acos(v[2]), -5.4); /* as the rate falls, -0.78 % per mrad */
        joint += both;
        all += both ? weight : 0;
        kept += both && event.recoil_kinetic > 151 ? weight : 0;
    }
    const double found = joint / EVENTS;
    const double share =
        cell(&e, ROW_PAIR, BH_COL_SOLID_ANGLE) / cell(&e, ROW_A, BH_COL_SOLID_ANGLE);
    ck_assert_msg(fabs(share - found) < 3.9 * sqrt(found * (1 - found) / EVENTS),
                  "solid angle: share %g, drawn %g", share, found);
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_KEPT), kept / all, 0.02, "kept");
    ck_assert_double_lt(kept, 0.95 * all);
    done(&e);
}
END_TEST

/* Rates alone from what is not computed: those of the neutron Rosenbluth proposal (2020), 1.37e4
 * and 3.39e6 Hz in 30 ns, printed 1390 Hz. */
START_TEST(accidentals)
{
    struct evaluated e =
        pair_with(A_USUAL ", other_rate: 13.7 kHz, momentum_bite: ±0.000001 %",
                  B_LARGE ", other_rate: 3390 kHz, momentum_bite: ±0.000001 %", "");
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_BACKGROUND), 1393.29, 1e-4, "accidentals");
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_BACKGROUND), 1390, 0.005, "as printed");
    done(&e);
}
END_TEST

START_TEST(accidentals_of_computed_rates)
{
    struct evaluated e = pair_with(A_USUAL, B_LARGE, ", beam: {duty_factor: 1 %}");
    const double a = cell(&e, ROW_A, BH_COL_SIGNAL) + cell(&e, ROW_A, BH_COL_BACKGROUND);
    const double b = cell(&e, ROW_B, BH_COL_SIGNAL) + cell(&e, ROW_B, BH_COL_BACKGROUND);
    const double found = cell(&e, ROW_PAIR, BH_COL_BACKGROUND);
    const double accidental = 30e-9 * a * b / 0.01;
    /* elastic pairs from the window come on top, where both particles are in */
    ck_assert_double_ge(found, accidental * (1 - 1e-9));
    bh_explanation *x = bh_explain(e.table, "K", "A+B", 0, NULL);
    double said = 0;
    for (size_t i = 0; i < bh_explanation_lines(x); i++) {
        const bh_line *line = bh_explanation_line(x, i);
        if (line->name && strcmp(line->name, "accidentals") == 0)
            said = strtod(line->value, NULL);
    }
    ck_assert_relative(said, accidental, 1e-5, "explained");
    bh_explanation_free(x);
    double bins = 0;
    for (size_t i = 0; i < 4; i++)
        bins += bin_cell(&e, 5 + i, BH_COL_BACKGROUND);
    ck_assert_relative(bins, found, 1e-4, "bins");
    done(&e);
}
END_TEST

START_TEST(live_fractions_multiply)
{
    struct evaluated e = pair_with(A_USUAL ", dead_time: 100 us",
                                   B_LARGE ", dead_time: 2 us, "
                                           "prescale: 2",
                                   ", time: 1 h");
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_LIVE),
                       cell(&e, ROW_A, BH_COL_LIVE) * cell(&e, ROW_B, BH_COL_LIVE), 1e-12, "live");
    ck_assert_double_lt(cell(&e, ROW_A, BH_COL_LIVE), 0.95);
    ck_assert_relative(cell(&e, ROW_PAIR, BH_COL_COUNTS),
                       cell(&e, ROW_PAIR, BH_COL_SIGNAL) * cell(&e, ROW_PAIR, BH_COL_LIVE) * 3600,
                       1e-12, "counts");
    done(&e);
}
END_TEST

/* Whichever arm is named first, the events are the same. */
START_TEST(order_does_not_matter)
{
    struct evaluated one = pair_with(A_USUAL ", momentum_bite: ±1 %", B_SMALL, "");
    char text[1024];
    snprintf(
        text, sizeof text,
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 uA}\n"
        "target: {scatterer: H, layers: [{material: aluminium, thickness: 0.1 mm, role: window},"
        " {material: liquid-hydrogen, thickness: 20 mm}]}\n"
        "models: {energy_loss: none}\n"
        "arms:\n  - {name: A, side: left, detects: either" A_USUAL ", momentum_bite: ±1 %%}\n"
        "  - {name: B, detects: recoil" B_SMALL "}\n"
        "settings:\n  - {name: K, arms: [{arm: A, angle: 40 deg}, {arm: B, angle: conjugate}], "
        "coincidence: {arms: [B, A], window: 30 ns}}\n");
    struct evaluated other = evaluate(text);
    ck_assert_str_eq(bh_table_text(other.table, false, ROW_PAIR, BH_COL_ARM), "B+A");
    ck_assert_relative(cell(&other, ROW_PAIR, BH_COL_SIGNAL), cell(&one, ROW_PAIR, BH_COL_SIGNAL),
                       2e-6, "signal");
    done(&one);
    done(&other);
}
END_TEST

/* What is lost on the way out: slow protons do not leave a thick target, electrons do. */
START_TEST(losses_act_on_both)
{
    char text[2][1024];
    double kept[2];
    for (int i = 0; i < 2; i++) {
        snprintf(
            text[i], sizeof text[i],
            "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 1 uA}\n"
            "target: {layers: [{material: liquid-hydrogen, thickness: 20 mm}]}\n"
            "models: {energy_loss: %s}\n"
            "arms:\n  - {name: A" A_USUAL "}\n  - {name: B, side: left, detects: recoil" B_LARGE
            ", threshold: 56 MeV}\n"
            "settings:\n  - {name: K, arms: [{arm: A, angle: 25 deg}, {arm: B, angle: conjugate}],"
            " coincidence: {arms: [A, B], window: 30 ns}}\n",
            i ? "full" : "none");
        struct evaluated e = evaluate(text[i]);
        kept[i] = cell(&e, ROW_PAIR, BH_COL_KEPT);
        done(&e);
    }
    ck_assert_double_eq_tol(kept[0], 1, 1e-3);
    ck_assert_msg(kept[1] > 0.1 && kept[1] < 0.95, "kept %g", kept[1]);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("pair");
    tcase_set_timeout(tests, 120);
    tcase_add_test(tests, a_row_of_its_own);
    tcase_add_test(tests, a_large_second_arm);
    tcase_add_test(tests, rows_multiply_out);
    tcase_add_loop_test(tests, as_events_drawn, 0, 3);
    tcase_add_test(tests, accidentals);
    tcase_add_test(tests, accidentals_of_computed_rates);
    tcase_add_test(tests, live_fractions_multiply);
    tcase_add_test(tests, order_does_not_matter);
    tcase_add_test(tests, losses_act_on_both);
    return run_suite("pair", tests);
}
