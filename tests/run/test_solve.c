/* test_solve.c - the value of an input that gives the wanted output is the one that does. */
#include "evaluated.h"

#include <gsl/gsl_errno.h>
#include <math.h>
#include <stdio.h>

#include "beamhours/base/number.h"
#include "beamhours/run/solve.h"

static const char *const plan =
    "plan: 1\n"
    "models: {energy_loss: none, radiative: none}\n"
    "beam: {particle: electron, kinetic_energy: 400 MeV, current: 10.0 ± 0.1 uA}\n"
    "targets:\n"
    "  - name: foil\n"
    "    layers:\n"
    "      - {material: aluminium, thickness: 20 um, role: window}\n"
    "      - {material: carbon-12, thickness: 1 mm}\n"
    "  - {name: sheet, layers: [{material: carbon-12, areal_density: 0.1 g/cm2}]}\n"
    "  - {name: thin, layers: [{material: carbon-12, areal_number: 1e20 /cm2}]}\n"
    "  - {name: two, layers: [{material: carbon-12, thickness: 1 mm}, {material: carbon-12, "
    "thickness: 1 mm}]}\n"
    "arms:\n"
    "  - {name: A, in_plane: ±10 mrad, out_of_plane: ±10 mrad, angle_range: {from: 20 deg, to: 100 "
    "deg}}\n"
    "  - {name: P, solid_angle: 2 msr}\n"
    "  - {name: D, solid_angle: 2 msr, dead_time: 100 us, dead_time_model: paralysable}\n"
    "every_setting: {target: foil, time: 2 h}\n"
    "settings:\n"
    "  - {name: K1, arm: A, angle: 30 deg}\n"
    "  - {name: K2, arm: P, q2: 0.05 GeV2}\n"
    "  - {name: K3, arm: A, angle: {from: 30 deg, to: 40 deg, step: 5 deg}}\n"
    "  - name: K4\n"
    "    beam: {momentum: 0.4 GeV/c, current: 3 uA}\n"
    "    arms:\n"
    "      - {arm: A, angle: 35 deg}\n"
    "      - {arm: P, angle: 45 deg}\n"
    "  - {name: K5, arm: A, angle: 30 deg, target: sheet}\n"
    "  - {name: K6, arm: A, angle: 30 deg, target: two, beam: {total_energy: 300 MeV}}\n"
    "  - {name: K7, arm: A, angle: 30 deg, target: thin, beam: {particle_rate: 1e13 /s}}\n"
    "  - {name: K8, arm: D, angle: 40 deg, target: sheet}\n";

static bh_material_library *library(void)
{
    static const char *const folders[] = {"materials", NULL};
    return bh_material_library_new(folders);
}

static bh_question ask(const char *setting, const char *by, bh_column_id column, double wanted)
{
    return (bh_question){.bytes = plan,
                         .length = strlen(plan),
                         .name = "p.yaml",
                         .setting = setting,
                         .column = column,
                         .wanted = wanted,
                         .by = by};
}

static bh_code solve(bh_question *q, bh_answer *a, bh_error *err)
{
    q->library = library();
    const bh_code code = bh_solve(q, a, err);
    bh_material_library_free(q->library);
    return code;
}

/* The output wanted is `factor` times the present one; `value` and `path` are what is to come. */
static const struct {
    const char *setting, *arm, *by, *path;
    bh_column_id column;
    double factor;
    const char *value;
    double number, tolerance; /* [1] of the value's number, relatively */
} rows[] = {
    /* rates are in proportion to current, thickness and solid angle (luminosity: definition) */
    {"K1", NULL, "current", "settings.K1.beam.current", BH_COL_SIGNAL, 3, "30 ± 0.1 uA", 30, 1e-5},
    {"K4", "P", "current", "settings.K4.beam.current", BH_COL_SIGNAL, 2, "6 uA", 6, 1e-5},
    {"K7", NULL, "current", "settings.K7.beam.current", BH_COL_SIGNAL, 0.5, NULL, 0.801088, 1e-5},
    {"K1", NULL, "thickness", "targets.foil.layers.2.thickness", BH_COL_SIGNAL, 0.25, "0.25 mm",
     0.25, 1e-5},
    {"K5", NULL, "thickness", "targets.sheet.layers.1.areal_density", BH_COL_SIGNAL, 2, "0.2 g/cm2",
     0.2, 1e-5},
    {"K7", NULL, "thickness", "targets.thin.layers.1.areal_number", BH_COL_SIGNAL, 2, "2e+20 /cm2",
     2e20, 1e-5},
    {"K2", NULL, "solid-angle", "arms.P.solid_angle", BH_COL_SIGNAL, 1.5, "3 msr", 3, 1e-5},
    {"K1", NULL, "solid-angle", "arms.A.solid_angle", BH_COL_SIGNAL, 2, NULL, 0.8, 1e-3},
    /* the uncertainty falls with the root of the time, and so do hours with the goal's square */
    {"K1", NULL, "every_setting.time", "every_setting.time", BH_COL_STATISTICAL, 0.5, "8 h", 8,
     1e-5},
    /* Q2 = 4 E E' sin^2(theta/2), E' = E/(1 + 2E/M sin^2(theta/2)) of a massless electron (any
     * textbook): by hand, M = 11174.862 MeV, E = 400.511 MeV */
    {"K1", NULL, "angle", "settings.K1.angle", BH_COL_Q2, 2, NULL, 43.0490, 1e-4},
    {"K2", NULL, "angle", "settings.K2.angle", BH_COL_Q2, 1, NULL, 32.5124, 1e-4},
    {"K3.2", NULL, "angle", "settings.K3.angle", BH_COL_Q2, 1, NULL, 35, 1e-5},
    {"K4", "A", "angle", "settings.K4.arms.1.angle", BH_COL_Q2, 1, "35 deg", 35, 1e-5},
    {"K4", "P", "energy", "settings.K4.beam.momentum", BH_COL_BEAM_KINETIC, 2, NULL, 0.8, 1e-2},
    {"K6", NULL, "energy", "settings.K6.beam.total_energy", BH_COL_BEAM_KINETIC, 2, NULL, 600,
     1e-2},
    {"K1", NULL, "energy", "settings.K1.beam.kinetic_energy", BH_COL_BEAM_KINETIC, 2, "800 MeV",
     800, 1e-5},
};

START_TEST(the_value_is_the_one_that_does)
{
    bh_answer now, then;
    bh_error err = {.text = ""};
    bh_question q = ask(rows[_i].setting, rows[_i].by, rows[_i].column, 1);
    q.arm = rows[_i].arm;
    ck_assert_msg(solve(&q, &now, &err) == BH_OK, "%s", err.text);
    q.wanted = rows[_i].factor * now.output;
    ck_assert_int_eq(solve(&q, &then, &err), BH_OK);
    ck_assert_msg(then.count == 1, "row %d: %zu", _i, then.count);
    ck_assert_str_eq(then.path, rows[_i].path);
    ck_assert(then.output == now.output);
    if (rows[_i].value)
        ck_assert_str_eq(then.solutions[0].text, rows[_i].value);
    double number = 0;
    ck_assert_int_eq(bh_number_parse(then.solutions[0].text, NULL, &number), BH_OK);
    ck_assert_msg(fabs(number / rows[_i].number - 1) < rows[_i].tolerance, "row %d: %s", _i,
                  then.solutions[0].text);
    ck_assert(fabs(then.solutions[0].output / q.wanted - 1) <= 1e-4);
    /* And the plan itself says so. */
    const bh_change change = {then.path, then.solutions[0].text};
    q.changes = &change;
    q.change_count = 1;
    if (strcmp(rows[_i].setting, "K3.2") == 0)
        q.setting = "K3";
    ck_assert_int_eq(solve(&q, &now, &err), BH_OK);
    ck_assert(now.output == then.solutions[0].output);
}
END_TEST

static void say(const bh_question *q, const bh_answer *a, const char *wanted)
{
    bh_text text = {0};
    bh_answer_say(q, a, &text);
    ck_assert_str_eq(text.bytes, wanted);
    bh_text_free(&text);
}

/* A paralysable detector counts n exp(-n tau): the same counts at two rates, and no more than
 * 1/(e tau) per second = 3678.8 Hz (Knoll, Radiation Detection and Measurement, 1979; from memory).
 */
START_TEST(several_values_and_turns)
{
    bh_answer a;
    bh_error err;
    bh_question q = ask("K8", "current", BH_COL_SIGNAL, 1);
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    const double signal = a.output;
    q.column = BH_COL_BACKGROUND;
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    const double most = 7200 / (exp(1.0) * 1e-4) * signal / (signal + a.output);
    q = ask("K8", "current", BH_COL_COUNTS, 0.5 * most);
    q.to = "1 A";
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    ck_assert_msg(a.count == 2, "%zu: %g to %g", a.count, a.least, a.most);
    q.wanted = 0.99999 * most; /* between two points of the grid */
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    ck_assert_uint_ge(a.count, 1);
    ck_assert(a.most > 0.99 * most);
    q.wanted = 1.01 * most;
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    ck_assert_uint_eq(a.count, 0);
    ck_assert(a.most <= most * (1 + 1e-6));
}
END_TEST

/* Behind a minimum of carbon's form factor three angles give the same cross section. */
START_TEST(the_nearest_first)
{
    bh_answer a;
    bh_error err;
    const bh_change change = {"settings.K1.angle", "62 deg"};
    bh_question q = ask("K1", "angle", BH_COL_CROSS_SECTION, 1);
    q.changes = &change;
    q.change_count = 1;
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    q.wanted = 0.9 * a.output;
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    ck_assert_msg(a.count >= 2, "%zu", a.count);
    double before = 0, least = 180, first = 0;
    for (size_t i = 0; i < a.count; i++) {
        double angle = 0;
        ck_assert_int_eq(bh_number_parse(a.solutions[i].text, NULL, &angle), BH_OK);
        ck_assert(fabs(angle - 62) >= before);
        before = fabs(angle - 62);
        least = fmin(least, angle);
        first = i ? first : angle;
    }
    ck_assert(first > least); /* they would not come in this order by themselves */
}
END_TEST

/* The unit may stand on both sides of the sign, and ends of the range have units of their own. */
START_TEST(an_uncertainty_keeps_its_unit)
{
    bh_answer a;
    bh_error err;
    const bh_change change = {"beam.current", "2 uA ± 0.1 uA"};
    bh_question q = ask("K1", "current", BH_COL_SIGNAL, 1);
    q.changes = &change;
    q.change_count = 1;
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    q.wanted = 2 * a.output;
    q.from = "500 nA";
    q.to = "0.01 mA";
    ck_assert_msg(solve(&q, &a, &err) == BH_OK, "%s", err.text);
    ck_assert_uint_eq(a.count, 1);
    ck_assert_str_eq(a.solutions[0].text, "4 uA ± 0.1 uA");
    ck_assert_str_eq(a.from, "0.5 uA ± 0.1 uA");
    ck_assert_str_eq(a.to, "10 uA ± 0.1 uA");
}
END_TEST

/* Between the angles that the plan takes and those that it does not, an acceptance all but touches
 * the beam, where the cross section has no number: the search goes on with the other angles. */
START_TEST(values_without_a_number_do_not_end_it)
{
    static const char *const wide =
        "plan: 1\n"
        "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"
        "target: {name: foil, layers: [{material: carbon-12, thickness: 1 mm}]}\n"
        "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad}]\n"
        "settings: [{name: K1, angle: 25 deg, goal: 1 %}]\n";
    bh_answer a;
    bh_error err = {.text = ""};
    bh_question q = ask("K1", "angle", BH_COL_Q2, 0.2);
    q.bytes = wide;
    q.length = strlen(wide);
    ck_assert_msg(solve(&q, &a, &err) == BH_OK, "%s", err.text);
    ck_assert_uint_eq(a.count, 1);
    ck_assert_str_eq(err.text, "");
}
END_TEST

/* Looking along a slab at 90 deg hours grow without bound and then have no number: what is wanted
 * lies on either side of the gap, and does it. */
START_TEST(both_sides_of_a_gap)
{
    static const char *const slab =
        "plan: 1\n"
        "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"
        "target: {name: cell, scatterer: H, layers: [{material: liquid-hydrogen, thickness: 50 "
        "mm}]}\n"
        "arms: [{name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, momentum_bite: ±5 %}]\n"
        "settings: [{name: K1, angle: 60 deg, goal: 1 %}]\n";
    bh_answer a;
    bh_error err = {.text = ""};
    bh_question q = ask("K1", "angle", BH_COL_HOURS, 0.1);
    q.bytes = slab;
    q.length = strlen(slab);
    q.from = "1.7 deg";
    q.to = "180 deg";
    ck_assert_msg(solve(&q, &a, &err) == BH_OK, "%s", err.text);
    ck_assert_uint_eq(a.count, 2);
    for (size_t i = 0; i < a.count; i++) {
        ck_assert_double_eq_tol(a.solutions[i].output, 0.1, 1e-5);
        ck_assert_double_eq_tol(strtod(a.solutions[i].text, NULL), i ? 90.57 : 89.38, 0.5);
    }
}
END_TEST

START_TEST(none_is_said)
{
    bh_answer a;
    bh_error err;
    bh_question q = ask("K1", "angle", BH_COL_Q2, 1);
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    ck_assert_uint_eq(a.count, 0);
    ck_assert_str_eq(a.from, "20 deg");
    ck_assert_str_eq(a.to, "100 deg");
    ck_assert_str_eq(a.at_most, "100 deg");
    ck_assert_str_eq(a.refused, "");
    q = ask("K1", "current", BH_COL_Q2, 0.1);
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    say(&q, &a,
        "no value of settings.K1.beam.current gives q2_GeV2 = 0.1000 GeV2 in setting K1 from 0.1 ± "
        "0.1 uA to 1000 ± 0.1 uA: it stays at 0.04278 GeV2");
    q = ask("K1", "angle", BH_COL_HOURS_TO_GOAL, 1);
    ck_assert_int_eq(solve(&q, &a, &err), BH_OK);
    say(&q, &a,
        "no value of settings.K1.angle gives hours_to_goal = 1.000 h in setting K1: the cell is "
        "empty with every value tried");
}
END_TEST

START_TEST(questions_without_sense_are_refused)
{
    static const struct {
        const char *setting, *arm, *by, *from, *to, *text;
    } odd[] = {
        {"K0", NULL, "current", NULL, NULL, "no setting \"K0\"; there are K1, K2"},
        {"K4", NULL, "current", NULL, NULL, "setting K4 has several arms; name one of A, P"},
        {"K4", "B", "current", NULL, NULL, "setting K4 has no arm \"B\"; there is A, P"},
        {"K6", NULL, "thickness", NULL, NULL, "target two has several samples; say which"},
        {"K1", NULL, "beam", NULL, NULL, "\"beam\" is no single quantity in the plan"},
        {"K1", NULL, "beam.particle", NULL, NULL, "\"beam.particle\" is no single quantity"},
        {"K1", NULL, "angle", "1 cm", NULL, "\"1 cm\" is no value that settings.K1.angle"},
        {"K1", NULL, "angle", NULL, "wide", "\"wide\" is no value that settings.K1.angle"},
        {"K1", NULL, "angle", "0.5 rad", "10 deg", "the range of settings.K1.angle needs a least"},
    };
    bh_answer a;
    for (int i = 0; i < COUNT(odd); i++) {
        bh_error err = {.text = ""};
        bh_question q = ask(odd[i].setting, odd[i].by, BH_COL_Q2, 0.1);
        q.arm = odd[i].arm;
        q.from = odd[i].from;
        q.to = odd[i].to;
        ck_assert_int_eq(solve(&q, &a, &err), BH_EDOMAIN);
        ck_assert_msg(strncmp(err.text, odd[i].text, strlen(odd[i].text)) == 0, "%s", err.text);
    }
    bh_error err;
    const bh_change bad = {"beam.current", "1 GeV"};
    bh_question q = ask("K1", "angle", BH_COL_Q2, 0.1);
    q.changes = &bad;
    q.change_count = 1;
    ck_assert_int_eq(solve(&q, &a, &err), BH_EPLAN);
    ck_assert_str_eq(err.text,
                     "beam.current: '1 GeV' is an energy: a current is needed, in uA or nA");
}
END_TEST

static bool stop(void *asker)
{
    return ++*(int *)asker > 40;
}

START_TEST(it_can_be_cancelled)
{
    int polled = 0;
    bh_answer a;
    bh_error err;
    bh_question q = ask("K1", "angle", BH_COL_Q2, 0.05);
    q.cancelled = stop;
    q.asker = &polled;
    ck_assert_int_eq(solve(&q, &a, &err), BH_ENOCONV);
    ck_assert_int_lt(polled, 60);
}
END_TEST

START_TEST(words_are_read)
{
    static const struct {
        const char *key;
        int column;
        const char *text;
        double wanted; /* [1] in the column's unit; NAN: refused */
    } words[] = {
        {"q2", BH_COL_Q2, "0.6", 0.6},
        {"q2_GeV2", BH_COL_Q2, "600000 MeV2", 0.6},
        {"rate", BH_COL_SIGNAL, "2 kHz", 2000},
        {"uncertainty", BH_COL_STATISTICAL, "0.5 %", 0.005},
        {"uncertainty", BH_COL_STATISTICAL, "0.005", 0.005},
        {"time", BH_COL_HOURS, "2 d", 48},
        {"hours", BH_COL_HOURS, " 2", NAN},
        {"hours", BH_COL_HOURS, "2 ", 2},
        {"charge", BH_COL_CHARGE, "1 C", 1000},
        {"angle", BH_COL_ANGLE, "0.1 rad", 5.729577951308233},
        {"solid_angle", BH_COL_SOLID_ANGLE, "1 sr", 1000},
        {"cross_section", BH_COL_CROSS_SECTION, "2", 2},
        {"luminosity_per_cm2_s", BH_COL_LUMINOSITY, "x", NAN},
        {"central_momentum", BH_COL_CENTRAL_MOMENTUM, "1 GeV/c", 1000},
        {"setting", BH_COLUMN_COUNT, "", 0},
        {"h", BH_COLUMN_COUNT, "", 0},
        {"", BH_COLUMN_COUNT, "", 0},
    };
    for (int i = 0; i < COUNT(words); i++) {
        double wanted = -1;
        bh_error err;
        ck_assert_msg((int)bh_solve_column(words[i].key, NULL) == words[i].column, "%s",
                      words[i].key);
        if (words[i].column == BH_COLUMN_COUNT)
            continue;
        const bh_code code =
            bh_solve_wanted((bh_column_id)words[i].column, words[i].text, &wanted, &err);
        ck_assert_int_eq(code, isnan(words[i].wanted) ? BH_EDOMAIN : BH_OK);
        if (!code)
            ck_assert_double_eq_tol(wanted, words[i].wanted, 1e-12 * words[i].wanted);
    }
    const char *near = NULL;
    ck_assert_int_eq((int)bh_solve_column("housr", &near), BH_COLUMN_COUNT);
    ck_assert_str_eq(near, "hours");
    for (int i = 0; i < BH_BY_COUNT; i++)
        ck_assert(bh_solve_input_name((bh_solve_input)i)[0] &&
                  bh_solve_input_meaning((bh_solve_input)i)[0]);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("solve");
    tcase_set_timeout(tests, 60);
    (void)gsl_set_error_handler_off();
    tcase_add_loop_test(tests, the_value_is_the_one_that_does, 0, COUNT(rows));
    tcase_add_test(tests, several_values_and_turns);
    tcase_add_test(tests, the_nearest_first);
    tcase_add_test(tests, an_uncertainty_keeps_its_unit);
    tcase_add_test(tests, values_without_a_number_do_not_end_it);
    tcase_add_test(tests, both_sides_of_a_gap);
    tcase_add_test(tests, none_is_said);
    tcase_add_test(tests, questions_without_sense_are_refused);
    tcase_add_test(tests, it_can_be_cancelled);
    tcase_add_test(tests, words_are_read);
    return run_suite("run/solve", tests);
}
