/* test_running.c - time laid out on the clock is the sum of time, in the right order. */
#include <math.h>

#include "../suite.h"

#include "beamhours/rates/schedule.h"

static const double at30[] = {0.5}, at40[] = {0.7};

/* Two energies, two targets, an angle that moves. */
static const bh_time_step steps[] = {{500, 1, 1, 1, at30, 10, 1},
                                     {500, 1, 2, 1, at40, 20, 2},
                                     {800, 1, 2, 1, at40, 30, 0},
                                     {800, 1, 2, 1, at40, 0, 0}};
static const bh_time_steps all = {COUNT(steps), steps};

static const bh_time_task plain[] = {{2, BH_TASK_ENERGY, 0, true},
                                     {3, BH_TASK_ONCE, 0, false},
                                     {1, BH_TASK_SETTING, 0, true},
                                     {4, BH_TASK_TARGET, 0, true},
                                     {5, BH_TASK_PARTICLE, 0, false}};
static const bh_time_task shifts[] = {
    {0.25, BH_TASK_SHIFT, 0, true}, {2, BH_TASK_PERIOD, 24, false}, {1, BH_TASK_ENERGY, 0, true}};

static bh_time_rules rules_of(const bh_time_task *tasks, size_t count)
{
    return (bh_time_rules){.start_up = 16,
                           .change_energy = 8,
                           .change_particle = NAN,
                           .change_target = 0.5,
                           .change_angle = NAN,
                           .availability = 0.5,
                           .contingency = 0.1,
                           .available = NAN,
                           .shift = 8,
                           .week = 168,
                           .task_count = count,
                           .tasks = tasks};
}

static const struct {
    const bh_time_task *tasks;
    size_t count;
} cases[] = {{NULL, 0}, {plain, COUNT(plain)}, {shifts, COUNT(shifts)}};

static double hours_of(const bh_time_layout *l, bh_span_kind kind, size_t step)
{
    double hours = 0;
    for (size_t i = 0; i < l->count; i++)
        if (l->spans[i].kind == kind && l->spans[i].step == step)
            hours += l->spans[i].hours;
    return hours;
}

/* Nothing overlaps, nothing is idle, and the end is what the sum says. */
START_TEST(it_adds_up)
{
    const bh_time_rules rules = rules_of(cases[_i].tasks, cases[_i].count);
    bh_arena *arena = bh_arena_new();
    bh_time_layout l;
    bh_time_sum sum;
    bh_error err;
    double times[8], placed[8] = {0}, clock = 0;
    ck_assert_int_eq(bh_time_lay_out(&all, &rules, arena, &l, &err), BH_OK);
    ck_assert_int_eq(bh_time_add_up(&all, &rules, &sum, times, &err), BH_OK);
    for (size_t i = 0; i < l.count; i++) {
        ck_assert_double_eq_tol(l.spans[i].begin, clock, 1e-9);
        clock += l.spans[i].clock;
        if (l.spans[i].kind == BH_SPAN_TASK)
            placed[l.spans[i].task] += l.spans[i].times;
    }
    ck_assert_double_eq_tol(clock, sum.asked, 1e-9);
    ck_assert_int_eq(l.spans[l.count - 1].kind, BH_SPAN_CONTINGENCY);
    ck_assert_double_eq_tol(l.spans[l.count - 1].begin, sum.scheduled, 1e-9);
    for (size_t t = 0; t < cases[_i].count; t++)
        ck_assert_double_eq(placed[t], times[t]);
    for (size_t s = 0; s < all.count; s++) {
        ck_assert_double_eq_tol(hours_of(&l, BH_SPAN_DATA, s), steps[s].hours, 1e-9);
        ck_assert_double_eq_tol(hours_of(&l, BH_SPAN_EMPTY, s), steps[s].empty_hours, 1e-9);
    }
    bh_arena_free(arena);
}
END_TEST

/* By hand: start-up; once, energy, setting, target, particle; data; empty; the change of target and
 * angle; ... */
START_TEST(everything_is_in_its_place)
{
    static const struct {
        bh_span_kind kind;
        unsigned changes;
        size_t step, task;
        double begin;
    } wanted[] = {{BH_SPAN_START_UP, 0, 0, 0, 0},
                  {BH_SPAN_TASK, 0, 0, 0, 16},
                  {BH_SPAN_TASK, 0, 0, 1, 20},
                  {BH_SPAN_TASK, 0, 0, 2, 23},
                  {BH_SPAN_TASK, 0, 0, 3, 25},
                  {BH_SPAN_TASK, 0, 0, 4, 33},
                  {BH_SPAN_DATA, 0, 0, 0, 38},
                  {BH_SPAN_EMPTY, 0, 0, 0, 58},
                  {BH_SPAN_CHANGE, BH_MISSING_TARGET | BH_MISSING_ANGLE, 1, 0, 60},
                  {BH_SPAN_TASK, 0, 1, 2, 60.5},
                  {BH_SPAN_TASK, 0, 1, 3, 62.5},
                  {BH_SPAN_DATA, 0, 1, 0, 70.5},
                  {BH_SPAN_EMPTY, 0, 1, 0, 110.5},
                  {BH_SPAN_CHANGE, BH_MISSING_ENERGY, 2, 0, 114.5},
                  {BH_SPAN_TASK, 0, 2, 0, 122.5},
                  {BH_SPAN_TASK, 0, 2, 2, 126.5},
                  {BH_SPAN_DATA, 0, 2, 0, 128.5},
                  {BH_SPAN_TASK, 0, 3, 2, 188.5},
                  {BH_SPAN_DATA, 0, 3, 0, 190.5},
                  {BH_SPAN_CONTINGENCY, 0, 3, 0, 190.5}};
    const bh_time_rules rules = rules_of(plain, COUNT(plain));
    bh_arena *arena = bh_arena_new();
    bh_time_layout l;
    bh_error err;
    ck_assert_int_eq(bh_time_lay_out(&all, &rules, arena, &l, &err), BH_OK);
    ck_assert_uint_eq(l.count, COUNT(wanted));
    for (size_t i = 0; i < l.count; i++) {
        ck_assert_int_eq(l.spans[i].kind, wanted[i].kind);
        ck_assert_uint_eq(l.spans[i].changes, wanted[i].changes);
        ck_assert_uint_eq(l.spans[i].step, wanted[i].step);
        ck_assert_uint_eq(l.spans[i].task, wanted[i].task);
        ck_assert_double_eq_tol(l.spans[i].begin, wanted[i].begin, 1e-9);
    }
    bh_arena_free(arena);
}
END_TEST

/* Tasks by shift come when a shift begins, or behind what is then under way; data go on. */
START_TEST(shifts_interrupt_data)
{
    const bh_time_rules rules = rules_of(shifts, COUNT(shifts));
    bh_arena *arena = bh_arena_new();
    bh_time_layout l;
    bh_error err;
    double count = 0, done = 0;
    ck_assert_int_eq(bh_time_lay_out(&all, &rules, arena, &l, &err), BH_OK);
    for (size_t i = 0; i < l.count; i++) {
        const bh_time_span *s = &l.spans[i];
        if (s->kind == BH_SPAN_DATA) {
            done = s->hours < s->done ? done + s->hours : s->hours;
            ck_assert_double_eq_tol(s->done, done, 1e-9);
        }
        if (s->kind != BH_SPAN_TASK || s->task != 0)
            continue;
        count += s->times;
        ck_assert_double_ge(s->begin + 1e-9, (count - 1) * 8); /* not before its shift */
        ck_assert_double_le(s->begin, count * 8 + 16);
        if (i && l.spans[i - 1].kind == BH_SPAN_DATA && l.spans[i - 1].done < 20)
            ck_assert_double_eq_tol(s->begin, (count - 1) * 8, 1e-9);
    }
    ck_assert_double_gt(count, 10);
    bh_arena_free(arena);
}
END_TEST

START_TEST(odd_inputs)
{
    const bh_time_task endless[] = {{9, BH_TASK_SHIFT, 0, false}};
    const bh_time_rules none = rules_of(NULL, 0), bad = rules_of(endless, 1);
    const bh_time_steps nothing = {0, NULL};
    bh_arena *arena = bh_arena_new();
    bh_time_layout l;
    bh_error err;
    ck_assert_int_eq(bh_time_lay_out(&all, &bad, arena, &l, &err), BH_EDOMAIN);
    ck_assert_uint_eq(l.count, 0);
    ck_assert_int_eq(bh_time_lay_out(&nothing, &none, arena, &l, &err), BH_OK);
    ck_assert_uint_eq(l.count, 2); /* start-up and its contingency */
    bh_arena_free(arena);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("running");
    tcase_add_loop_test(tests, it_adds_up, 0, COUNT(cases));
    tcase_add_test(tests, everything_is_in_its_place);
    tcase_add_test(tests, shifts_interrupt_data);
    tcase_add_test(tests, odd_inputs);
    return run_suite("rates/running", tests);
}
