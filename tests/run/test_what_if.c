/* test_what_if.c - what is left when beam is lost, against sums done by hand. */
#include "evaluated.h"

#include "beamhours/run/what_if.h"

/* No dead time, no window, no density loss: rates go with the current alone. */
#define FOIL                                                                         \
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n" \
    "target:\n  name: foil\n  layers: [{material: carbon-12, thickness: 0.1 mm}]\n"  \
    "arms: [{name: A, solid_angle: 2 msr, energy_cut: 10 MeV}]\n"

static const char *const three = FOIL
    "settings:\n"
    "  - {name: K1, angle: 30 deg, time: 20 h}\n"
    "  - {name: K2, angle: 35 deg, time: 10 h}\n"
    "  - {name: K3, angle: 40 deg, time: 30 h}\n"
    "schedule: {start_up: 8 h, changes: {angle: 1 h}, availability: 80 %, contingency: 10 %}\n";

struct asked {
    struct evaluated e;
    bh_arena *arena;
    bh_what_if what[BH_IF_COUNT];
};

static struct asked ask(const char *plan)
{
    struct asked a = {.e = evaluate(plan), .arena = bh_arena_new()};
    bh_error err = {.code = BH_OK};
    ck_assert_msg(!bh_what_if_make(a.e.table, a.arena, a.what, &err), "%s", err.text);
    return a;
}

static void put_away(struct asked *a)
{
    bh_arena_free(a->arena);
    done(&a->e);
}

static void near(double got, double wanted, const char *what)
{
    ck_assert_msg(fabs(got - wanted) <= 1e-6 * fabs(wanted), "%s: %.9g, not %.9g", what, got,
                  wanted);
}

static double number_in(const struct asked *a, size_t row, bh_column_id column)
{
    return bh_table_number(a->e.table, false, row, column);
}

START_TEST(as_planned_nothing_is_lost)
{
    struct asked a = ask(three);
    const bh_what_if *w = &a.what[BH_IF_AS_PLANNED];
    near(w->asked_hours, 1.1 * (60.0 / 0.8 + 8.0 + 2.0), "asked");
    near(w->data_left, 1.0, "data");
    ck_assert_uint_eq(w->drop_count, 0);
    for (size_t i = 0; i < 3; i++)
        near(w->uncertainty[i], number_in(&a, i, BH_COL_STATISTICAL), "uncertainty");
    put_away(&a);
}
END_TEST

/* Half the events in the same hours: the root of two, within what is lost to nothing. */
START_TEST(half_the_current_is_half_the_events)
{
    struct asked a = ask(three);
    const bh_what_if *w = &a.what[BH_IF_HALF_CURRENT];
    for (size_t i = 0; i < 3; i++)
        near(w->uncertainty[i], sqrt(2.0) * number_in(&a, i, BH_COL_STATISTICAL), "uncertainty");
    near(w->asked_hours, 1.1 * (60.0 / 0.8 + 10.0), "hours that are asked for stay");
    put_away(&a);
}
END_TEST

/* A target that thins by 1 % for each microampere has 90 % at 10 uA, 95 % at 5. */
START_TEST(half_the_current_spares_the_target)
{
    struct asked a =
        ask("plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 10 "
            "uA}\ntarget:\n  name: foil\n  layers: [{material: carbon-12, thickness: 1 "
            "um, density_loss: 1 %/uA}]\n"
            "arms: [{name: A, solid_angle: 2 msr, energy_cut: 10 MeV}]\n"
            "settings: [{name: K, angle: 30 deg, time: 10 h}]\n");
    const double more =
        a.what[BH_IF_HALF_CURRENT].uncertainty[0] / number_in(&a, 0, BH_COL_STATISTICAL);
    ck_assert_double_eq_tol(more, sqrt(2.0 * 0.90 / 0.95), 1e-4);
    put_away(&a);
}
END_TEST

/* With a goal they double. */
START_TEST(goals_take_twice_as_long_at_half_the_current)
{
    struct asked a = ask(FOIL "settings: [{name: K, angle: 30 deg, goal: 0.1 %}]\n");
    const double hours = number_in(&a, 0, BH_COL_HOURS);
    near(a.what[BH_IF_HALF_CURRENT].asked_hours, 2.0 * hours, "asked");
    near(a.what[BH_IF_HALF_CURRENT].uncertainty[0], sqrt(2.0) * 1e-3, "in the planned hours");
    put_away(&a);
}
END_TEST

/* u^2 = (s + b) / (s^2 T); twice b. */
START_TEST(twice_the_background_by_hand)
{
    struct asked a =
        ask("plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n"
            "target:\n  layers: [{material: polyethylene, thickness: 0.1 mm}]\n  scatterer: C\n"
            "arms: [{name: A, solid_angle: 2 msr, momentum_bite: ±20 %}]\n"
            "settings: [{name: K, angle: 50 deg, goal: 0.5 %}]\n");
    const double s = number_in(&a, 0, BH_COL_SIGNAL), b = number_in(&a, 0, BH_COL_BACKGROUND);
    const double seconds = 3600.0 * number_in(&a, 0, BH_COL_HOURS);
    ck_assert_double_gt(b, 0.0);
    near(a.what[BH_IF_DOUBLE_BACKGROUND].uncertainty[0], sqrt((s + 2.0 * b) / seconds) / s,
         "uncertainty");
    near(a.what[BH_IF_DOUBLE_BACKGROUND].asked_hours,
         number_in(&a, 0, BH_COL_HOURS) * (s + 2.0 * b) / (s + b), "asked");
    put_away(&a);
}
END_TEST

/* u^2 = (s + b) / (s^2 live T): the doubled background, and what else the arm triggers on, pass
 * through dead time, 1 / (1 + n tau) (Knoll, Radiation Detection and Measurement, chapter 4). */
START_TEST(twice_the_background_passes_through_dead_time)
{
    struct asked a =
        ask("plan: 1\nbeam: {particle: electron, kinetic_energy: 400 MeV, current: 10 uA}\n"
            "target:\n  layers: [{material: polyethylene, thickness: 0.1 mm}]\n  scatterer: C\n"
            "arms: [{name: A, solid_angle: 2 msr, momentum_bite: ±20 %, dead_time: 40 us,\n"
            "  other_rate: 3 kHz}]\n"
            "settings: [{name: K, angle: 50 deg, goal: 0.5 %}]\n");
    const double s = number_in(&a, 0, BH_COL_SIGNAL), b = number_in(&a, 0, BH_COL_BACKGROUND);
    const double seconds = 3600.0 * number_in(&a, 0, BH_COL_HOURS), tau = 40e-6, other = 3e3;
    const double live = 1.0 / (1.0 + (s + 2.0 * b + 2.0 * other) * tau);
    near(number_in(&a, 0, BH_COL_LIVE), 1.0 / (1.0 + (s + b + other) * tau), "live fraction");
    near(a.what[BH_IF_DOUBLE_BACKGROUND].uncertainty[0], sqrt((s + 2.0 * b) / (live * seconds)) / s,
         "uncertainty");
    put_away(&a);
}
END_TEST

/* 42 h of data and 20 h for the change of energy, 35 h granted.  The longest first, K2, L2, K1 go;
 * without K1 and K2 the change is saved, and L2 comes back. */
START_TEST(none_is_dropped_that_need_not_go)
{
    struct asked a =
        ask(FOIL "settings:\n"
                 "  - {name: K1, angle: 30 deg, time: 10 h}\n"
                 "  - {name: K2, angle: 30 deg, time: 12 h}\n"
                 "  - {name: L1, angle: 30 deg, time: 9 h, beam: {kinetic_energy: 300 MeV}}\n"
                 "  - {name: L2, angle: 30 deg, time: 11 h, beam: {kinetic_energy: 300 "
                 "MeV}}\nschedule: {changes: {energy: 20 h}, available: 35 h}\n");
    const bh_what_if *w = &a.what[BH_IF_AS_PLANNED];
    near(w->missing_hours, 62.0 - 35.0, "missing");
    ck_assert_uint_eq(w->drop_count, 2);
    ck_assert_uint_eq(w->drop[0], 1);
    ck_assert_uint_eq(w->drop[1], 0);
    put_away(&a);
}
END_TEST

/* Granted: 93.5 h.  At 40 %: (93.5 - 10) x 0.4 h of beam for 60 h of data. */
START_TEST(beam_in_forty_per_cent_of_the_time)
{
    struct asked a = ask(three);
    const bh_what_if *w = &a.what[BH_IF_LESS_BEAM];
    const double left = 83.5 * 0.4 / 60.0;
    near(w->data_left, left, "data");
    near(w->asked_hours, 1.1 * (60.0 / 0.4 + 10.0), "asked");
    near(w->missing_hours, 160.0 - 93.5, "missing");
    near(w->uncertainty[1], number_in(&a, 1, BH_COL_STATISTICAL) / sqrt(left), "uncertainty");
    /* without K3: 30 h / 0.4 + 9 h = 84 h fit */
    ck_assert_uint_eq(w->drop_count, 1);
    ck_assert_uint_eq(w->drop[0], 2);
    put_away(&a);
}
END_TEST

/* 69.5 h are left, 59.5 h of them for data. */
START_TEST(a_day_less)
{
    struct asked a = ask(three);
    const bh_what_if *w = &a.what[BH_IF_LOST_DAY];
    near(w->data_left, 59.5 * 0.8 / 60.0, "data");
    near(w->missing_hours, 85.0 + 24.0 - 93.5, "missing");
    near(w->asked_hours, 93.5 + 24.0, "asked");
    ck_assert_uint_eq(w->drop_count, 1);
    put_away(&a);
}
END_TEST

START_TEST(what_is_available_limits_what_is_granted)
{
    struct asked a = ask(FOIL "settings: [{name: K, angle: 30 deg, time: 20 h}]\n"
                              "schedule: {available: 16 h}\n");
    near(a.what[BH_IF_AS_PLANNED].missing_hours, 4.0, "missing");
    near(a.what[BH_IF_LESS_BEAM].data_left, 16.0 * 0.4 / 20.0, "data");
    ck_assert_uint_eq(a.what[BH_IF_AS_PLANNED].drop_count, 1);
    near(a.what[BH_IF_AS_PLANNED].data_left, 0.8, "data as planned");
    near(a.what[BH_IF_DOUBLE_BACKGROUND].data_left, 0.8, "data with twice the background");
    near(a.what[BH_IF_HALF_CURRENT].uncertainty[0],
         number_in(&a, 0, BH_COL_STATISTICAL) * sqrt(2.0 / 0.8), "half the current in that time");
    ck_assert_double_eq(a.what[BH_IF_LOST_DAY].data_left, 0.0);
    ck_assert(isnan(a.what[BH_IF_LOST_DAY].uncertainty[0]));
    put_away(&a);
}
END_TEST

/* Hours of beam that are available come on the calendar with availability, and changes beside. */
START_TEST(beam_hours_limit_too)
{
    struct asked a =
        ask(FOIL
            "settings: [{name: K, angle: 30 deg, time: 20 h}]\n"
            "schedule: {available: 15 h, available_as: beam, start_up: 8 h, availability: 50 %}\n");
    near(a.what[BH_IF_AS_PLANNED].data_left, 0.75, "data");
    near(a.what[BH_IF_AS_PLANNED].missing_hours, 48.0 - 38.0, "missing");
    put_away(&a);
}
END_TEST

START_TEST(every_case_has_words)
{
    for (int i = 0; i < BH_IF_COUNT; i++)
        ck_assert_uint_gt(strlen(bh_what_if_words((bh_if)i)), 5);
    ck_assert_str_eq(bh_what_if_words(BH_IF_COUNT), "");
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("what_if");
    tcase_add_test(tests, as_planned_nothing_is_lost);
    tcase_add_test(tests, half_the_current_is_half_the_events);
    tcase_add_test(tests, half_the_current_spares_the_target);
    tcase_add_test(tests, goals_take_twice_as_long_at_half_the_current);
    tcase_add_test(tests, twice_the_background_by_hand);
    tcase_add_test(tests, twice_the_background_passes_through_dead_time);
    tcase_add_test(tests, none_is_dropped_that_need_not_go);
    tcase_add_test(tests, beam_hours_limit_too);
    tcase_add_test(tests, beam_in_forty_per_cent_of_the_time);
    tcase_add_test(tests, a_day_less);
    tcase_add_test(tests, what_is_available_limits_what_is_granted);
    tcase_add_test(tests, every_case_has_words);
    return run_suite("run/what_if", tests);
}
