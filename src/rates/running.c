/* running.c - the sum of time laid out on the clock, in the order of running. */
#include <math.h>
#include <string.h>

#include "beamhours/rates/schedule.h"

struct running {
    const bh_time_steps *steps;
    const bh_time_rules *rules;
    const double *times; /* how often each task takes place in all */
    double *placed;      /* how often it did so far */
    bh_time_layout *out;
    double clock, availability;
    size_t step;
};

static void add(struct running *r, const bh_time_span *span)
{
    bh_time_span *next = &r->out->spans[r->out->count++];
    *next = *span;
    next->begin = r->clock;
    next->step = r->step;
    r->clock += next->clock;
}

/* --- tasks --- */

static double period_of(const struct running *r, size_t task)
{
    const bh_time_task *t = &r->rules->tasks[task];
    if (t->every == BH_TASK_SHIFT)
        return r->rules->shift;
    return t->every == BH_TASK_PERIOD ? t->period : INFINITY;
}

static void add_task(struct running *r, size_t task, double times)
{
    const bh_time_task *t = &r->rules->tasks[task];
    const double hours = times * t->hours;
    r->placed[task] += times;
    add(r, &(bh_time_span){.kind = BH_SPAN_TASK,
                           .task = task,
                           .times = (int)times,
                           .hours = hours,
                           .clock = t->needs_beam ? hours / r->availability : hours});
}

/* When the next one of a task by shift or period is due; infinity when all had their place. */
static double due_at(const struct running *r, size_t task)
{
    const double period = period_of(r, task);
    return isfinite(period) && r->placed[task] < r->times[task] ? r->placed[task] * period
                                                                : INFINITY;
}

/* Where due and clock differ by rounding alone, it is due. */
static bool is_due(const struct running *r, size_t task)
{
    return due_at(r, task) <= r->clock * (1 + 1e-12);
}

static void add_due(struct running *r)
{
    bool any = true;
    while (any) {
        any = false;
        for (size_t i = 0; i < r->rules->task_count; i++) {
            if (!is_due(r, i))
                continue;
            const double behind = floor(r->clock * (1 + 1e-12) / period_of(r, i)) + 1;
            add_task(r, i, fmin(behind, r->times[i]) - r->placed[i]);
            any = true;
        }
    }
}

static double next_due(const struct running *r)
{
    double next = INFINITY;
    for (size_t i = 0; i < r->rules->task_count; i++)
        next = fmin(next, due_at(r, i));
    return next;
}

static bool belongs_here(bh_task_every every, bool first, unsigned changes)
{
    switch (every) {
    case BH_TASK_ONCE:
        return first;
    case BH_TASK_ENERGY:
        return first || (changes & BH_MISSING_ENERGY);
    case BH_TASK_PARTICLE:
        return first || (changes & BH_MISSING_PARTICLE);
    case BH_TASK_TARGET:
        return first || (changes & BH_MISSING_TARGET);
    case BH_TASK_SETTING:
        return true;
    case BH_TASK_SHIFT:
    case BH_TASK_PERIOD:
    default:
        return false;
    }
}

/* --- steps --- */

/* Data or empty target, in as many pieces as tasks by shift or period make of it. */
static void add_beam(struct running *r, bh_span_kind kind, double hours)
{
    double done = 0;
    for (;;) {
        add_due(r);
        const double room = (next_due(r) - r->clock) * r->availability;
        const bool last = !(hours - done > room);
        const double piece = last ? hours - done : room;
        done = last ? hours : done + piece;
        add(r, &(bh_time_span){
                   .kind = kind, .hours = piece, .clock = piece / r->availability, .done = done});
        if (last)
            return;
        r->clock = fmax(r->clock, next_due(r)); /* but for rounding it is there */
    }
}

static void add_step(struct running *r)
{
    double hours = 0;
    const bh_time_step *step = &r->steps->steps[r->step];
    const unsigned changes = bh_time_changes(r->steps, r->rules, r->step, &hours);
    if (changes)
        add(r, &(bh_time_span){
                   .kind = BH_SPAN_CHANGE, .changes = changes, .hours = hours, .clock = hours});
    for (size_t i = 0; i < r->rules->task_count; i++)
        if (belongs_here(r->rules->tasks[i].every, r->step == 0, changes))
            add_task(r, i, 1);
    add_beam(r, BH_SPAN_DATA, step->hours);
    if (step->empty_hours > 0)
        add_beam(r, BH_SPAN_EMPTY, step->empty_hours);
}

/* No layout has more: each task by shift or period may cut one span in two. */
static double most_spans(const struct running *r)
{
    double most = 2 + 3 * (double)r->steps->count;
    for (size_t i = 0; i < r->rules->task_count; i++)
        most += 2 * r->times[i];
    return most;
}

static void add_all(struct running *r)
{
    const double start_up = r->rules->start_up;
    if (start_up > 0)
        add(r, &(bh_time_span){.kind = BH_SPAN_START_UP, .hours = start_up, .clock = start_up});
    for (r->step = 0; r->step < r->steps->count; r->step++)
        add_step(r);
    r->step = r->steps->count ? r->steps->count - 1 : 0;
    add_due(r);
    const double contingency = r->out->sum.contingency;
    if (contingency > 0)
        add(r, &(bh_time_span){
                   .kind = BH_SPAN_CONTINGENCY, .hours = contingency, .clock = contingency});
}

bh_code bh_time_lay_out(const bh_time_steps *steps, const bh_time_rules *rules, bh_arena *arena,
                        bh_time_layout *out, bh_error *err)
{
    double *times = bh_arena_take(arena, rules->task_count + 1, sizeof *times);
    struct running r = {.steps = steps,
                        .rules = rules,
                        .times = times,
                        .placed = bh_arena_take(arena, rules->task_count + 1, sizeof(double)),
                        .out = out,
                        .availability = isnan(rules->availability) ? 1 : rules->availability};
    *out = (bh_time_layout){0};
    if (!times || !r.placed)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    const bh_code code = bh_time_add_up(steps, rules, &out->sum, times, err);
    if (code)
        return code;
    const double most = most_spans(&r);
    out->spans = most < 1e9 ? bh_arena_take(arena, (size_t)most, sizeof *out->spans) : NULL;
    if (!out->spans)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    add_all(&r);
    return BH_OK;
}
