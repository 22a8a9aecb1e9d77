/* schedules.c - beam time and all around it. */
#include "beamhours/plan/making.h"

#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"

static void make_task(const bh_raw_task *raw, bh_task *task)
{
    *task = (bh_task){
        .name = raw->name,
        .time = raw->time,
        .every = (bh_every)bh_schema_choice(raw->every.word.text, bh_words_every),
        .needs_beam = !raw->beam.text || strcmp(raw->beam.text, "none") != 0,
        .at = raw->section.at,
    };
    if (raw->every.value.given) {
        task->every = BH_EVERY_TIME;
        task->period = raw->every.value;
    }
}

/* Hours of what returns with every shift or period, for each scheduled hour: from 1 on the time
 * would never end. */
static void check_returning(const bh_making *making, const bh_schedule *schedule)
{
    const bh_list *list = &making->raw.schedule.tasks;
    char number[BH_NUMBER_SIZE];
    double share = 0.0;
    for (size_t i = 0; i < schedule->task_count; i++) {
        const bh_task *t = &schedule->tasks[i];
        const double beam = t->needs_beam ? schedule->availability.value : 1.0;
        const double period = t->every == BH_EVERY_SHIFT  ? schedule->shift.value
                              : t->every == BH_EVERY_TIME ? t->period.value
                                                          : INFINITY;
        share += t->time.value / beam / period;
    }
    if (!(share >= 1.0))
        return;
    bh_number_digits(share, 4, number, sizeof number);
    bh_tell(making, list->at, &making->raw.schedule.section, "tasks", BH_SAY_TASKS_FILL, number);
}

bh_code bh_make_schedule(bh_making *making)
{
    const bh_raw_schedule *raw = &making->raw.schedule;
    const bh_raw_task *tasks = raw->tasks.items;
    bh_task *made = bh_arena_take(making->reading.arena, raw->tasks.count + 1, sizeof *made);
    if (!made)
        return BH_ENOMEM;
    for (size_t i = 0; i < raw->tasks.count; i++)
        make_task(&tasks[i], &made[i]);
    making->plan.schedule = (bh_schedule){
        .given = raw->section.given,
        .available = raw->available,
        .available_is_beam = raw->available_as.text && strcmp(raw->available_as.text, "beam") == 0,
        .availability = raw->availability,
        .shift = raw->shift,
        .week = raw->week,
        .start_up = raw->start_up,
        .change_energy = raw->changes.energy,
        .change_particle = raw->changes.particle,
        .change_target = raw->changes.target,
        .change_angle = raw->changes.angle,
        .task_count = raw->tasks.count,
        .tasks = made,
        .contingency = raw->contingency,
        .at = raw->section.at,
    };
    check_returning(making, &making->plan.schedule);
    return BH_OK;
}
