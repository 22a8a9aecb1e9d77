/* schedules.c - beam time and all around it. */
#include "beamhours/plan/making.h"

#include <string.h>

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
    return BH_OK;
}
