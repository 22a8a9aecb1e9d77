/* totals.c - the sum of time of a plan, from the hours of its settings. */
#include "beamhours/run/totals.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/text.h"
#include "beamhours/rates/counting.h"
#include "beamhours/rates/schedule.h"

static double hours_if_given(const bh_value *value)
{
    return value->given ? value->value / BH_SECONDS_PER_HOUR : (double)NAN;
}

static double if_given(const bh_value *value)
{
    return value->given ? value->value : (double)NAN;
}

static bool set_tasks(const bh_schedule *s, bh_arena *arena, bh_time_rules *rules)
{
    static const bh_task_every every[] = {
        [BH_EVERY_ONCE] = BH_TASK_ONCE,         [BH_EVERY_ENERGY] = BH_TASK_ENERGY,
        [BH_EVERY_PARTICLE] = BH_TASK_PARTICLE, [BH_EVERY_TARGET] = BH_TASK_TARGET,
        [BH_EVERY_SETTING] = BH_TASK_SETTING,   [BH_EVERY_SHIFT] = BH_TASK_SHIFT,
        [BH_EVERY_TIME] = BH_TASK_PERIOD};
    bh_time_task *tasks = bh_arena_take(arena, s->task_count + 1, sizeof *tasks);
    for (size_t i = 0; tasks && i < s->task_count; i++)
        tasks[i] = (bh_time_task){.hours = s->tasks[i].time.value / BH_SECONDS_PER_HOUR,
                                  .every = every[s->tasks[i].every],
                                  .period = s->tasks[i].period.value / BH_SECONDS_PER_HOUR,
                                  .needs_beam = s->tasks[i].needs_beam};
    rules->task_count = s->task_count;
    rules->tasks = tasks;
    return tasks;
}

static bool set_rules(const bh_schedule *s, bh_arena *arena, bh_time_rules *rules)
{
    *rules = (bh_time_rules){.start_up = hours_if_given(&s->start_up),
                             .change_energy = hours_if_given(&s->change_energy),
                             .change_particle = hours_if_given(&s->change_particle),
                             .change_target = hours_if_given(&s->change_target),
                             .change_angle = hours_if_given(&s->change_angle),
                             .availability = if_given(&s->availability),
                             .contingency = if_given(&s->contingency),
                             .available = hours_if_given(&s->available),
                             .available_is_beam = s->available_is_beam,
                             .shift = s->shift.value / BH_SECONDS_PER_HOUR,
                             .week = s->week.value / BH_SECONDS_PER_HOUR};
    return set_tasks(s, arena, rules);
}

/* The first setting with the same beam particle stands for its kind. */
static int kind_of(const bh_plan *plan, size_t setting)
{
    size_t first = 0;
    while (strcmp(plan->settings[first].beam.particle.name,
                  plan->settings[setting].beam.particle.name) != 0)
        first++;
    return (int)first;
}

static void set_angles(const bh_plan *plan, const bh_setting *setting, double *angles)
{
    for (size_t i = 0; i < plan->arm_count; i++)
        angles[i] = (double)NAN;
    for (size_t a = 0; a < setting->arm_count; a++)
        for (size_t i = 0; i < plan->arm_count; i++)
            if (strcmp(plan->arms[i].name.text, setting->arms[a].arm.name.text) == 0)
                angles[i] = setting->arms[a].angle.value;
}

static bh_time_step *make_steps(const bh_plan *plan, const bh_stretch *hours, bh_arena *arena)
{
    bh_time_step *steps = bh_arena_take(arena, plan->setting_count + 1, sizeof *steps);
    double *angles =
        bh_arena_take(arena, plan->setting_count * plan->arm_count + 1, sizeof(double));
    if (!steps || !angles)
        return NULL;
    for (size_t s = 0; s < plan->setting_count; s++) {
        const bh_setting *setting = &plan->settings[s];
        steps[s] = (bh_time_step){.energy = setting->beam.kinetic_energy.value,
                                  .particle = kind_of(plan, s),
                                  .target = (int)(setting->target - plan->targets),
                                  .angle_count = plan->arm_count,
                                  .angles = angles + s * plan->arm_count,
                                  .hours = hours[s].full,
                                  .empty_hours = hours[s].empty};
        set_angles(plan, setting, angles + s * plan->arm_count);
    }
    return steps;
}

static const struct {
    unsigned bit;
    const char *name;
} missing[] = {{BH_MISSING_START_UP, "start-up"},
               {BH_MISSING_ENERGY, "change of energy"},
               {BH_MISSING_PARTICLE, "change of particle"},
               {BH_MISSING_TARGET, "change of target"},
               {BH_MISSING_ANGLE, "change of angle"}};

/* "none given: start-up, change of angle", or NULL when nothing is missing.  False: no memory. */
static bool set_note(unsigned bits, bh_arena *arena, const char **note)
{
    bh_text text = {0};
    for (size_t i = 0; i < sizeof missing / sizeof missing[0]; i++)
        if (bits & missing[i].bit) {
            bh_text_append(&text, text.length ? ", " : "none given: ");
            bh_text_append(&text, missing[i].name);
        }
    char *copy = text.length ? bh_arena_take(arena, text.length + 1, 1) : NULL;
    if (copy)
        memcpy(copy, text.bytes, text.length);
    const bool done = !text.failed && (copy || !text.length);
    bh_text_free(&text);
    *note = copy;
    return done;
}

bh_code bh_time_of_plan(const bh_plan *plan, const bh_stretch *hours, bh_arena *arena,
                        bh_time_detail *out, bh_error *err)
{
    bh_time_rules rules;
    const bh_time_steps steps = {.count = plan->setting_count,
                                 .steps = make_steps(plan, hours, arena)};
    out->times = bh_arena_take(arena, plan->schedule.task_count + 1, sizeof *out->times);
    if (!steps.steps || !out->times || !set_rules(&plan->schedule, arena, &rules))
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return bh_time_add_up(&steps, &rules, &out->sum, out->times, err);
}

bh_code bh_time_layout_of_plan(const bh_plan *plan, const bh_stretch *hours, bh_arena *arena,
                               bh_time_layout *out, bh_error *err)
{
    bh_time_rules rules;
    const bh_time_steps steps = {.count = plan->setting_count,
                                 .steps = make_steps(plan, hours, arena)};
    if (!steps.steps || !set_rules(&plan->schedule, arena, &rules))
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return bh_time_lay_out(&steps, &rules, arena, out, err);
}

void bh_stretches_of(const bh_table *table, bh_stretch *hours)
{
    const bh_plan *plan = bh_table_plan(table);
    for (size_t s = 0; s < plan->setting_count; s++)
        hours[s] = (bh_stretch){0.0, 0.0};
    for (size_t i = 0; i < bh_table_rows(table, false); i++) {
        const double full = bh_table_number(table, false, i, BH_COL_HOURS);
        const double empty = bh_table_number(table, false, i, BH_COL_EMPTY_HOURS);
        hours[bh_table_place(table, false, i).setting] =
            (bh_stretch){isfinite(full) ? full : 0.0, isfinite(empty) ? empty : 0.0};
    }
}

bh_code bh_totals_from_plan(const bh_plan *plan, const bh_stretch *hours, bh_arena *arena,
                            bh_totals *out, bh_error *err)
{
    bh_time_detail detail;
    const bh_code code = bh_time_of_plan(plan, hours, arena, &detail, err);
    if (code)
        return code;
    const bh_time_sum sum = detail.sum;
    *out = (bh_totals){.data_hours = sum.data,
                       .empty_hours = sum.empty,
                       .task_hours = sum.task,
                       .change_hours = sum.change,
                       .beam_hours = sum.beam,
                       .scheduled_hours = sum.scheduled,
                       .contingency_hours = sum.contingency,
                       .asked_hours = sum.asked,
                       .available_hours = sum.available,
                       .spare_hours = sum.spare,
                       .shifts = sum.shifts,
                       .weeks = sum.weeks};
    return set_note(sum.missing, arena, &out->note)
               ? BH_OK
               : bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}
