/* schedule.c - the sum of time: data, empty target, tasks, changes, contingency, asked and spare.
 */
#include "beamhours/rates/schedule.h"

#include <math.h>

enum { ROUNDS = 100000 };

/* What changes from one step to the next: times taken, and how often. */
typedef struct {
    double hours; /* [h] */
    int energy, particle, target, angle;
} changes;

static double or_else(double given, double otherwise)
{
    return isnan(given) ? otherwise : given;
}

/* --- checks --- */

/* Absent (NAN), or a number from 0 up. */
static bool duration(double hours)
{
    return isnan(hours) || (hours >= 0 && isfinite(hours));
}

static bool rules_make_sense(const bh_time_rules *r)
{
    const double availability = or_else(r->availability, 1);
    return duration(r->start_up) && duration(r->change_energy) && duration(r->change_particle) &&
           duration(r->change_target) && duration(r->change_angle) && duration(r->contingency) &&
           duration(r->available) && availability > 0 && availability <= 1 && r->shift > 0 &&
           r->week > 0;
}

static bool task_makes_sense(const bh_time_task *task)
{
    return task->hours >= 0 && isfinite(task->hours) &&
           (task->every != BH_TASK_PERIOD || task->period > 0);
}

static bh_code check(const bh_time_steps *steps, const bh_time_rules *rules, bh_error *err)
{
    if (!rules_make_sense(rules))
        return bh_fail(err, BH_EDOMAIN,
                       "a time, a share or a unit of the schedule is out of range");
    for (size_t i = 0; i < rules->task_count; i++)
        if (!task_makes_sense(&rules->tasks[i]))
            return bh_fail(err, BH_EDOMAIN, "task %zu has no time of 0 h or more", i + 1);
    for (size_t i = 0; i < steps->count; i++)
        if (!(steps->steps[i].hours >= 0 && steps->steps[i].empty_hours >= 0))
            return bh_fail(err, BH_EDOMAIN, "setting %zu has no time of 0 h or more", i + 1);
    return BH_OK;
}

/* --- changes --- */

static double angle_at(const bh_time_step *step, size_t arm)
{
    return arm < step->angle_count ? step->angles[arm] : (double)NAN;
}

/* Where an arm stood last before step `at`; NAN when it was not yet needed. */
static double last_angle(const bh_time_steps *steps, size_t at, size_t arm)
{
    for (size_t i = at; i-- > 0;) {
        const double angle = angle_at(&steps->steps[i], arm);
        if (!isnan(angle))
            return angle;
    }
    return (double)NAN;
}

static bool an_arm_moves(const bh_time_steps *steps, size_t at)
{
    const bh_time_step *step = &steps->steps[at];
    for (size_t arm = 0; arm < step->angle_count; arm++) {
        const double now = step->angles[arm];
        const double before = last_angle(steps, at, arm);
        if (!isnan(now) && !isnan(before) && now != before)
            return true;
    }
    return false;
}

/* The longest so far when this one takes place as well. */
static double longest(double so_far, bool takes_place, double hours)
{
    return takes_place ? fmax(so_far, or_else(hours, 0)) : so_far;
}

unsigned bh_time_changes(const bh_time_steps *steps, const bh_time_rules *rules, size_t at,
                         double *hours)
{
    *hours = 0;
    if (at == 0)
        return 0;
    const bh_time_step *before = &steps->steps[at - 1];
    const bh_time_step *now = &steps->steps[at];
    const bool energy = now->energy != before->energy;
    const bool particle = now->particle != before->particle;
    const bool target = now->target != before->target;
    const bool angle = an_arm_moves(steps, at);
    *hours = longest(*hours, energy, rules->change_energy);
    *hours = longest(*hours, particle, rules->change_particle);
    *hours = longest(*hours, target, rules->change_target);
    *hours = longest(*hours, angle, rules->change_angle);
    return (energy ? BH_MISSING_ENERGY : 0U) | (particle ? BH_MISSING_PARTICLE : 0U) |
           (target ? BH_MISSING_TARGET : 0U) | (angle ? BH_MISSING_ANGLE : 0U);
}

static changes changes_between(const bh_time_steps *steps, const bh_time_rules *rules)
{
    changes sum = {0};
    for (size_t i = 1; i < steps->count; i++) {
        double hours = 0;
        const unsigned what = bh_time_changes(steps, rules, i, &hours);
        sum.hours += hours;
        sum.energy += (what & BH_MISSING_ENERGY) != 0;
        sum.particle += (what & BH_MISSING_PARTICLE) != 0;
        sum.target += (what & BH_MISSING_TARGET) != 0;
        sum.angle += (what & BH_MISSING_ANGLE) != 0;
    }
    return sum;
}

/* The bit when a time is needed and was not given. */
static unsigned missing_bit(bool needed, double hours, unsigned bit)
{
    return needed && isnan(hours) ? bit : 0;
}

static unsigned missing_of(const bh_time_rules *r, const changes *c)
{
    return missing_bit(true, r->start_up, BH_MISSING_START_UP) |
           missing_bit(c->energy > 0, r->change_energy, BH_MISSING_ENERGY) |
           missing_bit(c->particle > 0, r->change_particle, BH_MISSING_PARTICLE) |
           missing_bit(c->target > 0, r->change_target, BH_MISSING_TARGET) |
           missing_bit(c->angle > 0, r->change_angle, BH_MISSING_ANGLE);
}

/* --- tasks --- */

/* Periods begun in a time; a time that ends on a period's end, but for rounding, begins no other.
 */
static double begun(double scheduled, double period)
{
    return ceil(scheduled / period * (1 - 1e-12));
}

/* How often a task takes place; `scheduled` [h] is what the running time is known to be so far. */
static double times_of(const bh_time_task *task, const bh_time_rules *rules, const bh_time_sum *sum,
                       size_t steps)
{
    if (steps == 0)
        return 0;
    switch (task->every) {
    case BH_TASK_ENERGY:
        return 1 + sum->energy_changes;
    case BH_TASK_PARTICLE:
        return 1 + sum->particle_changes;
    case BH_TASK_TARGET:
        return 1 + sum->target_changes;
    case BH_TASK_SETTING:
        return (double)steps;
    case BH_TASK_SHIFT:
        return begun(sum->scheduled, rules->shift);
    case BH_TASK_PERIOD:
        return begun(sum->scheduled, task->period);
    case BH_TASK_ONCE:
    default:
        return 1;
    }
}

/* Sums again with the tasks as often as the scheduled time of the round before asks for. */
static void sum_round(const bh_time_steps *steps, const bh_time_rules *rules, double fixed_change,
                      bh_time_sum *sum)
{
    double task = 0;
    double idle = 0;
    for (size_t i = 0; i < rules->task_count; i++) {
        const bh_time_task *t = &rules->tasks[i];
        const double hours = times_of(t, rules, sum, steps->count) * t->hours;
        task += t->needs_beam ? hours : 0;
        idle += t->needs_beam ? 0 : hours;
    }
    sum->task = task;
    sum->beam = sum->data + sum->empty + task;
    sum->change = fixed_change + idle;
    sum->scheduled = sum->beam / or_else(rules->availability, 1) + sum->change;
}

/* Hours of tasks by shift or period per scheduled hour: from 1 on they would never end. */
static double own_share(const bh_time_rules *rules)
{
    double share = 0;
    for (size_t i = 0; i < rules->task_count; i++) {
        const bh_time_task *t = &rules->tasks[i];
        const double stretched =
            t->needs_beam ? t->hours / or_else(rules->availability, 1) : t->hours;
        if (t->every == BH_TASK_SHIFT)
            share += stretched / rules->shift;
        else if (t->every == BH_TASK_PERIOD)
            share += stretched / t->period;
    }
    return share;
}

static bool settle(const bh_time_steps *steps, const bh_time_rules *rules, double fixed_change,
                   bh_time_sum *sum)
{
    for (int round = 0; round < ROUNDS; round++) {
        const double before = sum->scheduled;
        sum_round(steps, rules, fixed_change, sum);
        if (sum->scheduled == before)
            return true;
    }
    return false;
}

/* --- all --- */

static void finish(const bh_time_rules *rules, bh_time_sum *sum)
{
    sum->contingency = or_else(rules->contingency, 0) * sum->scheduled;
    sum->asked = sum->scheduled + sum->contingency;
    sum->available = rules->available;
    sum->spare = rules->available - (rules->available_is_beam ? sum->beam : sum->asked);
    sum->shifts = sum->asked / rules->shift;
    sum->weeks = sum->asked / rules->week;
}

bh_code bh_time_add_up(const bh_time_steps *steps, const bh_time_rules *rules, bh_time_sum *out,
                       double *times, bh_error *err)
{
    const bh_code code = check(steps, rules, err);
    if (code != BH_OK)
        return code;
    const changes c = changes_between(steps, rules);
    bh_time_sum sum = {.energy_changes = c.energy,
                       .particle_changes = c.particle,
                       .target_changes = c.target,
                       .angle_changes = c.angle,
                       .missing = missing_of(rules, &c)};
    for (size_t i = 0; i < steps->count; i++) {
        sum.data += steps->steps[i].hours;
        sum.empty += steps->steps[i].empty_hours;
    }
    const double fixed_change = or_else(rules->start_up, 0) + c.hours;
    if (own_share(rules) >= 1 || !settle(steps, rules, fixed_change, &sum))
        return bh_fail(
            err, BH_EDOMAIN,
            "tasks that return with every shift or period take all of it: %.3g h of each "
            "scheduled hour; give them less time or a longer period",
            own_share(rules));
    finish(rules, &sum);
    for (size_t i = 0; times && i < rules->task_count; i++)
        times[i] = times_of(&rules->tasks[i], rules, &sum, steps->count);
    *out = sum;
    return BH_OK;
}
