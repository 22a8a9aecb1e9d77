/* test_schedule.c - the sum of time: a plan by hand, tasks of every kind, laws, odd inputs. */
#include "beamhours/rates/schedule.h"

#include <math.h>
#include <string.h>

#include "../suite.h"

static const double a25[] = {0.4, (double)NAN};
static const double a30[] = {0.5, (double)NAN};
static const double b40[] = {(double)NAN, 0.7};
static const double b41[] = {0.5, 0.8};

/* Two energies, two particles, two targets; arm 0 stands at 0.4, 0.5, rests, 0.5; arm 1 moves from
 * 0.7 to 0.8. */
static const bh_time_step steps[] = {
    {500, 1, 1, 2, a25, 10, 1},  {500, 1, 1, 2, a30, 20, 2}, {800, 1, 1, 2, b40, 5, 0},
    {800, 2, 2, 2, b41, 7, 0.5}, {800, 2, 2, 2, b41, 3, 0},
};

static bh_time_rules rules_of(const bh_time_task *tasks, size_t count)
{
    return (bh_time_rules){.start_up = 16,
                           .change_energy = 8,
                           .change_particle = 6,
                           .change_target = 20 / 60.0,
                           .change_angle = 0.5,
                           .availability = 0.6,
                           .contingency = 0.1,
                           .available = 14 * 24,
                           .shift = 8,
                           .week = 168,
                           .task_count = count,
                           .tasks = tasks};
}

static bh_time_sum sum_of(const bh_time_rules *rules, double *times)
{
    const bh_time_steps all = {COUNT(steps), steps};
    bh_time_sum out;
    bh_error err;
    ck_assert_msg(bh_time_add_up(&all, rules, &out, times, &err) == BH_OK, "%s", err.text);
    return out;
}

START_TEST(by_hand)
{
    const bh_time_task tasks[] = {{8, BH_TASK_ENERGY, 0, true}, {16, BH_TASK_ONCE, 0, false}};
    const bh_time_rules rules = rules_of(tasks, 2);
    double times[2];
    const bh_time_sum t = sum_of(&rules, times);
    ck_assert_double_eq_tol(t.data, 45, 1e-12);
    ck_assert_double_eq_tol(t.empty, 3.5, 1e-12);
    ck_assert_double_eq_tol(t.task, 16, 1e-12);
    ck_assert_double_eq_tol(t.beam, 64.5, 1e-12);
    /* start-up 16, angle 0.5, energy 8, particle with target and angle 6, nothing; survey 16 */
    ck_assert_double_eq_tol(t.change, 46.5, 1e-12);
    ck_assert_double_eq_tol(t.scheduled, 64.5 / 0.6 + 46.5, 1e-12);
    ck_assert_double_eq_tol(t.contingency, 0.1 * t.scheduled, 1e-12);
    ck_assert_double_eq_tol(t.asked, 1.1 * t.scheduled, 1e-12);
    ck_assert_double_eq_tol(t.spare, 336 - t.asked, 1e-12);
    ck_assert_double_eq_tol(t.shifts, t.asked / 8, 1e-12);
    ck_assert_double_eq_tol(t.weeks, t.asked / 168, 1e-12);
    ck_assert_int_eq(t.energy_changes, 1);
    ck_assert_int_eq(t.particle_changes, 1);
    ck_assert_int_eq(t.target_changes, 1);
    ck_assert_int_eq(t.angle_changes, 2); /* the resting arm comes back where it stood */
    ck_assert(times[0] == 2 && times[1] == 1 && t.missing == 0 && t.available == 336);
}
END_TEST

START_TEST(how_often_tasks_return)
{
    const bh_time_task tasks[] = {
        {1, BH_TASK_ONCE, 0, true},     {1, BH_TASK_ENERGY, 0, true},
        {1, BH_TASK_PARTICLE, 0, true}, {1, BH_TASK_TARGET, 0, false},
        {1, BH_TASK_SETTING, 0, true},  {0.25, BH_TASK_SHIFT, 0, true},
        {2, BH_TASK_PERIOD, 24, false},
    };
    double times[COUNT(tasks)];
    const bh_time_rules rules = rules_of(tasks, COUNT(tasks));
    const bh_time_sum t = sum_of(&rules, times);
    const double wanted[] = {1, 2, 2, 2, 5, ceil(t.scheduled / 8), ceil(t.scheduled / 24)};
    double beam = 48.5;
    double change = 16 + 0.5 + 8 + 6;
    for (int i = 0; i < COUNT(tasks); i++) {
        ck_assert_msg(times[i] == wanted[i], "task %d: %g not %g", i, times[i], wanted[i]);
        beam += tasks[i].needs_beam ? times[i] * tasks[i].hours : 0;
        change += tasks[i].needs_beam ? 0 : times[i] * tasks[i].hours;
    }
    ck_assert_double_eq_tol(t.beam, beam, 1e-12);
    ck_assert_double_eq_tol(t.change, change, 1e-12);
    ck_assert_double_eq_tol(t.scheduled, beam / 0.6 + change, 1e-12);
    ck_assert_double_eq_tol(t.task, t.beam - t.data - t.empty, 1e-12);
}
END_TEST

START_TEST(the_least_number_of_returns)
{
    /* 48.5 h of beam at full availability, 1 h each 8 h: 48.5 + n <= 8 n first holds for 7 */
    const bh_time_task task = {1, BH_TASK_SHIFT, 0, true};
    bh_time_rules rules = rules_of(&task, 1);
    rules.start_up = rules.change_energy = rules.change_particle = rules.change_angle = 0;
    rules.change_target = 0;
    rules.availability = (double)NAN;
    double times;
    ck_assert_double_eq_tol(sum_of(&rules, &times).scheduled, 55.5, 1e-12);
    ck_assert(times == 7);
    /* an end on the period's end begins no other: 48.5 h and 5 x 0.3 h are 50 h */
    const bh_time_task exact = {0.3, BH_TASK_PERIOD, 10, true};
    rules.tasks = &exact;
    ck_assert_double_eq_tol(sum_of(&rules, &times).scheduled, 50, 1e-12);
    ck_assert(times == 5);
}
END_TEST

START_TEST(what_nobody_gave)
{
    bh_time_rules rules = rules_of(NULL, 0);
    rules.start_up = rules.change_energy = rules.change_particle = rules.change_target =
        (double)NAN;
    rules.change_angle = rules.availability = rules.contingency = rules.available = (double)NAN;
    const bh_time_sum t = sum_of(&rules, NULL);
    ck_assert_uint_eq(t.missing, BH_MISSING_START_UP | BH_MISSING_ENERGY | BH_MISSING_PARTICLE |
                                     BH_MISSING_TARGET | BH_MISSING_ANGLE);
    ck_assert(t.change == 0 && t.contingency == 0 && t.asked == t.beam && t.beam == 48.5);
    ck_assert(isnan(t.available) && isnan(t.spare));
    /* only what takes place is missing */
    const bh_time_steps one = {1, steps};
    bh_time_sum alone;
    rules.start_up = 0;
    ck_assert_int_eq(bh_time_add_up(&one, &rules, &alone, NULL, NULL), BH_OK);
    ck_assert_uint_eq(alone.missing, 0);
}
END_TEST

START_TEST(beam_hours_granted)
{
    bh_time_rules rules = rules_of(NULL, 0);
    rules.available_is_beam = true;
    rules.available = 60;
    const bh_time_sum t = sum_of(&rules, NULL);
    ck_assert_double_eq_tol(t.spare, 60 - 48.5, 1e-12);
}
END_TEST

START_TEST(no_settings_no_tasks)
{
    const bh_time_task task = {1, BH_TASK_SHIFT, 0, true};
    const bh_time_rules rules = rules_of(&task, 1);
    const bh_time_steps none = {0, NULL};
    bh_time_sum out;
    double times = 9;
    ck_assert_int_eq(bh_time_add_up(&none, &rules, &out, &times, NULL), BH_OK);
    ck_assert(out.beam == 0 && out.scheduled == 16 && times == 0);
}
END_TEST

/* One member made wrong at a time. */
static void spoil(bh_time_rules *rules, bh_time_task *task, bh_time_step *step, int how)
{
    double *members[] = {&rules->start_up,      &rules->change_energy, &rules->change_particle,
                         &rules->change_target, &rules->change_angle,  &rules->contingency,
                         &rules->available,     &rules->availability,  &rules->shift,
                         &rules->week,          &task->hours,          &task->period,
                         &step->hours,          &step->empty_hours};
    *members[how] = -1;
}

START_TEST(odd_inputs_are_refused)
{
    bh_time_task task = {1, BH_TASK_PERIOD, 24, true};
    bh_time_step step = steps[0];
    bh_time_rules rules = rules_of(&task, 1);
    const bh_time_steps one = {1, &step};
    bh_time_sum out = {.data = 77};
    bh_error err;
    spoil(&rules, &task, &step, _i);
    ck_assert_msg(bh_time_add_up(&one, &rules, &out, NULL, &err) == BH_EDOMAIN, "case %d", _i);
    ck_assert(out.data == 77 && err.text[0]);
}
END_TEST

START_TEST(other_odd_inputs)
{
    bh_time_task task = {1, BH_TASK_ONCE, 0, true};
    bh_time_step step = steps[0];
    bh_time_rules rules = rules_of(&task, 1);
    const bh_time_steps one = {1, &step};
    bh_time_sum out;
    bh_error err;
    step.hours = (double)NAN;
    ck_assert_int_eq(bh_time_add_up(&one, &rules, &out, NULL, &err), BH_EDOMAIN);
    step.hours = 1;
    task.hours = (double)NAN;
    ck_assert_int_eq(bh_time_add_up(&one, &rules, &out, NULL, &err), BH_EDOMAIN);
    rules.task_count = 0;
    rules.availability = 1.5;
    ck_assert_int_eq(bh_time_add_up(&one, &rules, &out, NULL, &err), BH_EDOMAIN);
}
END_TEST

START_TEST(tasks_that_never_end)
{
    const bh_time_task tasks[] = {{5, BH_TASK_SHIFT, 0, true}, {2, BH_TASK_PERIOD, 8, false}};
    const bh_time_rules rules = rules_of(tasks, 2); /* 5 h of beam take 8.3 h of each shift */
    const bh_time_steps all = {COUNT(steps), steps};
    bh_time_sum out;
    bh_error err;
    ck_assert_int_eq(bh_time_add_up(&all, &rules, &out, NULL, &err), BH_EDOMAIN);
    ck_assert(strstr(err.text, "longer period"));
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("schedule");
    tcase_add_test(tests, by_hand);
    tcase_add_test(tests, how_often_tasks_return);
    tcase_add_test(tests, the_least_number_of_returns);
    tcase_add_test(tests, what_nobody_gave);
    tcase_add_test(tests, beam_hours_granted);
    tcase_add_test(tests, no_settings_no_tasks);
    tcase_add_loop_test(tests, odd_inputs_are_refused, 0, 14);
    tcase_add_test(tests, other_odd_inputs);
    tcase_add_test(tests, tasks_that_never_end);
    return run_suite("schedule", tests);
}
