/* test_totals.c - the sum of time of a plan, added up by hand. */
#include "evaluated.h"

#define PLAN                                                                                 \
    "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA}\n"         \
    "target:\n  name: t\n  layers: [{material: liquid-hydrogen, thickness: 4 cm}]\n"         \
    "  scatterer: H\n  empty_target: {share: 10 %}\narms: [{name: A, solid_angle: 1 msr}]\n" \
    "settings:\n  - {name: K1, angle: 20 deg, time: 10 h}\n"                                 \
    "  - {name: K2, angle: 30 deg, time: 20 h}\n"                                            \
    "  - {name: K3, angle: 30 deg, time: 30 h, beam: {kinetic_energy: 500 MeV}}\n"           \
    "  - {name: K4, angle: 40 deg, time: 40 h, beam: {kinetic_energy: 500 MeV, particle: "   \
    "positron}}\n"

/* data 100, empty 10; tasks with beam: optics 2 x 3 = 6, checks 4 x 1 = 4, calibration each 24 h;
 * changes: start-up 16, K1-K2 angle 0.5, K2-K3 energy 8, K3-K4 the longer of particle 6 and angle
 * 0.5; survey 16 without beam.  Scheduled S: beam / 0.5 + 46.5, beam = 120 + 0.5 ceil(S / 24) +
 * 0.25 ceil(S / 12).  ceil(S/24) = 13, ceil(S/12) = 25: beam = 132.75, S = 312 gives 13 and 26 ...
 */
START_TEST(by_hand)
{
    struct evaluated e = evaluate(
        PLAN "schedule:\n  available: 14 d\n  availability: 50 %\n  shift: 12 h\n  week: 125 h\n"
             "  start_up: 16 h\n  changes: {energy: 8 h, particle: 6 h, target: 20 min, angle: 30 "
             "min}\n  tasks:\n    - {name: optics, time: 3 h, every: energy}\n"
             "    - {name: checks, time: 60 min, every: setting}\n"
             "    - {name: calibration, time: 30 min, every: 1 d}\n"
             "    - {name: handover, time: 15 min, every: shift}\n"
             "    - {name: survey, time: 16 h, beam: none}\n  contingency: 10 %\n");
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_relative(t->data_hours, 100, 1e-12, "data");
    ck_assert_relative(t->empty_hours, 10, 1e-12, "empty");
    ck_assert_relative(t->change_hours, 16 + 0.5 + 8 + 6 + 16, 1e-12, "changes");
    double scheduled = 0, beam = 0;
    for (int round = 0; round < 100; round++) { /* the least time that holds its own tasks */
        beam = 110 + 6 + 4 + 0.5 * ceil(scheduled / 24) + 0.25 * ceil(scheduled / 12);
        scheduled = beam / 0.5 + 46.5;
    }
    ck_assert_relative(t->beam_hours, beam, 1e-12, "beam");
    ck_assert_relative(t->task_hours, beam - 110, 1e-12, "tasks");
    ck_assert_relative(t->scheduled_hours, scheduled, 1e-12, "scheduled");
    ck_assert_relative(t->contingency_hours, 0.1 * scheduled, 1e-12, "contingency");
    ck_assert_relative(t->asked_hours, 1.1 * scheduled, 1e-12, "asked");
    ck_assert_relative(t->available_hours, 336, 1e-12, "14 days");
    ck_assert_relative(t->spare_hours, 336 - 1.1 * scheduled, 1e-12, "spare");
    ck_assert_relative(t->shifts, 1.1 * scheduled / 12, 1e-12, "shifts");
    ck_assert_relative(t->weeks, 1.1 * scheduled / 125, 1e-12, "weeks");
    ck_assert_ptr_null(t->note);
    done(&e);
}
END_TEST

START_TEST(nobody_gave_the_times)
{
    struct evaluated e = evaluate(PLAN);
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_relative(t->asked_hours, 110, 1e-12, "hours alone");
    ck_assert_relative(t->shifts, 110.0 / 8, 1e-12, "shifts of 8 h");
    ck_assert_relative(t->weeks, 110.0 / 168, 1e-12, "weeks of 168 h");
    ck_assert_str_eq(t->note,
                     "none given: start-up, change of energy, change of particle, change of angle");
    done(&e);
    e = evaluate(PLAN "schedule: {available: 5 d, available_as: beam, availability: 60 %}\n");
    t = bh_table_totals(e.table);
    ck_assert_relative(t->scheduled_hours, 110 / 0.6, 1e-12, "stretched");
    ck_assert_relative(t->spare_hours, 10, 1e-10, "compared with beam hours");
    done(&e);
}
END_TEST

/* Two arms, of which one moves at a time or neither: K2 moves B, K3 nothing, K4 A, K5 both at once.
 */
START_TEST(an_arm_that_moves_is_a_change)
{
    static const int degrees[][2] = {{20, 60}, {20, 70}, {20, 70}, {30, 70}, {40, 80}};
    char text[2048];
    size_t n = (size_t)snprintf(
        text, sizeof text,
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 10 uA}\n"
        "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 4 cm}], scatterer: H}\n"
        "arms: [{name: A, solid_angle: 1 msr}, {name: B, side: left, solid_angle: 1 msr}]\n"
        "schedule: {start_up: 0 h, changes: {angle: 1 h}}\nsettings:\n");
    for (int i = 0; i < COUNT(degrees); i++)
        n += (size_t)snprintf(text + n, sizeof text - n,
                              "  - {name: K%d, arms: [{arm: A, angle: %d deg, time: 1 h}, {arm: B, "
                              "angle: %d deg}]}\n",
                              i + 1, degrees[i][0], degrees[i][1]);
    struct evaluated e = evaluate(text);
    ck_assert_relative(bh_table_totals(e.table)->change_hours, 3, 1e-12, "K2, K4, K5");
    done(&e);
}
END_TEST

/* Muon-lifetime proposal, beam-time estimate: 1e12 events of 12 muons in each cycle of 12 us, 75 %
 * accepted, at 80 % of the time: 2.1e9 an hour (rounded down), 475 h, 3.8 weeks of 125 h.  3 %. The
 * rate of one arm is made 0.75e6 /s by its efficiency. */
START_TEST(muon_lifetime_proposal)
{
    static const char form[] =
        "plan: 1\nmodels: {energy_loss: none}\nbeam: {particle: muon+, momentum: 29 MeV/c, "
        "particle_rate: 1e6 /s}\n"
        "target: {name: t, layers: [{material: liquid-hydrogen, areal_density: %.12g g/cm2}], "
        "scatterer: 1H}\narms: [{name: A, solid_angle: 1 sr}]\n"
        "settings: [{name: K, angle: 90 deg, counts: 1000000000000}]\n"
        "schedule: {availability: 80 %%, week: 125 h, start_up: 0 h}\n";
    char text[1024];
    snprintf(text, sizeof text, form, 1.0);
    struct evaluated e = evaluate(text);
    const double thickness = 0.75e6 / cell(&e, 0, BH_COL_SIGNAL);
    done(&e);
    snprintf(text, sizeof text, form, thickness);
    e = evaluate(text);
    ck_assert_relative(cell(&e, 0, BH_COL_SIGNAL), 0.75e6, 1e-9, "12 in 12 us, 75 %");
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_relative(t->scheduled_hours, 475, 0.03, "muon-lifetime proposal");
    ck_assert_relative(1e12 / t->scheduled_hours, 2.1e9, 0.03, "muon-lifetime proposal");
    ck_assert_relative(t->weeks, 3.8, 0.03, "muon-lifetime proposal");
    done(&e);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("totals");
    tcase_add_test(tests, by_hand);
    tcase_add_test(tests, nobody_gave_the_times);
    tcase_add_test(tests, an_arm_that_moves_is_a_change);
    tcase_add_test(tests, muon_lifetime_proposal);
    return run_suite("run/totals", tests);
}
