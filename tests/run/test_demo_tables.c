/* test_demo_tables.c - the demonstration plans and a full schedule, evaluated from end to end. */
#include "evaluated.h"

static const char *const demos[] = {"hydrogen-separation", "hydrogen-jet", "positron-electron",
                                    "muon-rings",          "alpha-gold",   "lead"};

START_TEST(a_demo_gives_a_table)
{
    char path[128], text[65536] = "";
    snprintf(path, sizeof path, "plans/%s.yaml", demos[_i]);
    FILE *file = fopen(path, "rb");
    ck_assert_ptr_nonnull(file);
    ck_assert_uint_gt(fread(text, 1, sizeof text - 1, file), 100);
    fclose(file);
    struct evaluated e = evaluate(text);
    ck_assert_uint_gt(bh_table_rows(e.table, false), 0);
    for (size_t row = 0; row < bh_table_rows(e.table, false); row++) {
        ck_assert_double_gt(cell(&e, row, BH_COL_SIGNAL), 0);
        ck_assert_double_gt(cell(&e, row, BH_COL_HOURS), 0);
        const double live = cell(&e, row, BH_COL_LIVE);
        ck_assert(live > 0 && live <= 1);
        ck_assert_double_gt(cell(&e, row, BH_COL_STATISTICAL), 0);
    }
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_relative(t->beam_hours, t->data_hours + t->empty_hours + t->task_hours, 1e-12,
                       "beam hours");
    ck_assert_relative(t->asked_hours, t->scheduled_hours + t->contingency_hours, 1e-12, "asked");
    ck_assert_relative(t->spare_hours, t->available_hours - t->asked_hours, 1e-9, "spare");
    done(&e);
}
END_TEST

/* Every kind of task and change, summed by hand. */
START_TEST(a_schedule_adds_up)
{
    struct evaluated e = evaluate(
        "plan: 1\nbeam: {particle: electron, kinetic_energy: 500 MeV, current: 1 uA}\n"
        "targets:\n  - {name: a, layers: [{material: graphite, thickness: 1 mm}]}\n"
        "  - {name: b, layers: [{material: graphite, thickness: 2 mm}]}\n"
        "arms: [{name: A, solid_angle: 1 msr}]\n"
        "settings:\n  - {name: one, target: a, angle: 40 deg, time: 10 h}\n"
        "  - {name: two, target: b, angle: 40 deg, time: 20 h}\n"
        "  - {name: three, target: b, angle: 50 deg, time: 20 h, beam: {kinetic_energy: 600 MeV}}\n"
        "  - {name: four, target: b, angle: 50 deg, time: 6 h, beam: {particle: positron}}\n"
        "schedule:\n  available: 10 d\n  availability: 50 %\n  shift: 8 h\n  week: 168 h\n"
        "  start_up: 8 h\n"
        "  changes: {energy: 4 h, particle: 6 h, target: 30 min, angle: 1 h}\n"
        "  tasks:\n    - {name: once, time: 1 h}\n"
        "    - {name: energy, time: 2 h, every: energy}\n"
        "    - {name: particle, time: 3 h, every: particle}\n"
        "    - {name: target, time: 1 h, every: target}\n"
        "    - {name: setting, time: 30 min, every: setting, beam: none}\n"
        "  contingency: 10 %\n");
    const bh_totals *t = bh_table_totals(e.table);
    ck_assert_double_eq(t->data_hours, 56);
    ck_assert_double_eq(t->empty_hours, 0);
    /* once 1, energy 3 x 2 (back to 500 MeV), particle 2 x 3, target 2 x 1 */
    ck_assert_double_eq(t->task_hours, 15);
    /* start-up 8; target 0.5; energy and angle together 4; particle and energy together 6; no beam
     * 4 x 0.5 */
    ck_assert_double_eq(t->change_hours, 20.5);
    ck_assert_double_eq(t->beam_hours, 71);
    ck_assert_double_eq(t->scheduled_hours, 162.5);
    ck_assert_double_eq(t->contingency_hours, 16.25);
    ck_assert_double_eq(t->asked_hours, 178.75);
    ck_assert_double_eq(t->spare_hours, 61.25);
    ck_assert_relative(t->shifts, 178.75 / 8, 1e-12, "shifts");
    ck_assert_ptr_null(t->note);
    done(&e);
}
END_TEST

/* A view limits the target: the nearer to 90 degrees, the shorter the seen part; the rate then
 * falls with the angle by that too. */
START_TEST(a_view_changes_the_sensitivity)
{
    static const char form[] =
        "plan: 1\nmodels: {energy_loss: none}\nbeam: {particle: electron, kinetic_energy: 500 MeV, "
        "current: 1 uA}\n"
        "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 15 cm}], scatterer: H}\n"
        "arms: [{name: A, solid_angle: 1 msr%s}]\nsettings: [{name: K, angle: 50 deg, time: 1 "
        "h}]\n";
    char text[1024];
    snprintf(text, sizeof text, form, "");
    struct evaluated all = evaluate(text);
    snprintf(text, sizeof text, form, ", target_view: ±2 cm");
    struct evaluated part = evaluate(text);
    const double degree = 3.14159265358979323846 / 180;
    ck_assert_relative(cell(&part, 0, BH_COL_SEEN) / cell(&all, 0, BH_COL_SEEN),
                       4 / sin(50 * degree) / 15, 1e-9, "seen");
    ck_assert_relative(cell(&part, 0, BH_COL_PER_MRAD) - cell(&all, 0, BH_COL_PER_MRAD),
                       -1e-3 / tan(50 * degree), 1e-5, "d ln(1/sin)");
    done(&all);
    done(&part);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("demo tables");
    tcase_add_loop_test(tests, a_demo_gives_a_table, 0, COUNT(demos));
    tcase_add_test(tests, a_schedule_adds_up);
    tcase_add_test(tests, a_view_changes_the_sensitivity);
    return run_suite("demo tables", tests);
}
