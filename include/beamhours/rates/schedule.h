/* schedule.h - the sum of time: data, empty target, tasks, changes, contingency, asked and spare.
 */
#ifndef BH_RATES_SCHEDULE_H
#define BH_RATES_SCHEDULE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/error.h"

/* One setting, in the order of running; two are alike in energy, particle, target when the numbers
 * are equal. */
typedef struct {
    double energy;        /* [MeV] beam kinetic energy */
    int particle;         /* a number for each kind of beam */
    int target;           /* a number for each target */
    size_t angle_count;   /* entries of angles; may differ from step to step */
    const double *angles; /* [rad] by arm number; NAN: the arm takes no part and stays where it is
                             (before its first part it stands where it is first needed) */
    double hours;         /* [h] full target, >= 0 */
    double empty_hours;   /* [h] without sample, >= 0 */
} bh_time_step;

typedef enum {
    BH_TASK_ONCE,
    BH_TASK_ENERGY,   /* once for each run of consecutive steps with the same energy */
    BH_TASK_PARTICLE, /* the same for the particle */
    BH_TASK_TARGET,   /* the same for the target */
    BH_TASK_SETTING,  /* once for each step */
    BH_TASK_SHIFT,    /* once for each shift begun */
    BH_TASK_PERIOD    /* once for each `period` begun */
} bh_task_every;

typedef struct {
    double hours; /* [h] each time, >= 0 */
    bh_task_every every;
    double period;   /* [h] for BH_TASK_PERIOD, above 0 */
    bool needs_beam; /* false: counted among the changes */
} bh_time_task;

/* Times that nobody gave are NAN: they count 0 and are reported as missing. */
typedef struct {
    double start_up;        /* [h] */
    double change_energy;   /* [h] */
    double change_particle; /* [h] */
    double change_target;   /* [h] */
    double change_angle;    /* [h] */
    double availability;    /* [1] above 0, at most 1; NAN: 1 */
    double contingency;     /* [1] share of the scheduled time; NAN: 0 */
    double available;       /* [h] what the facility grants; NAN: not known */
    bool available_is_beam; /* compared with beam hours, not with calendar hours */
    double shift, week;     /* [h] above 0: the facility's units */
    size_t task_count;
    const bh_time_task *tasks;
} bh_time_rules;

/* Which times were needed and not given (bits of bh_time_sum.missing). */
enum {
    BH_MISSING_START_UP = 1,
    BH_MISSING_ENERGY = 2,
    BH_MISSING_PARTICLE = 4,
    BH_MISSING_TARGET = 8,
    BH_MISSING_ANGLE = 16
};

typedef struct {
    double data, empty;   /* [h] sums over the steps */
    double task;          /* [h] tasks that need beam */
    double change;        /* [h] start-up, changes, tasks without beam */
    double beam;          /* [h] data + empty + task */
    double scheduled;     /* [h] beam / availability + change */
    double contingency;   /* [h] share x scheduled */
    double asked;         /* [h] scheduled + contingency */
    double available;     /* [h] NAN when not known */
    double spare;         /* [h] available - asked (or - beam); NAN when not known */
    double shifts, weeks; /* [1] asked / shift, asked / week */
    int energy_changes, particle_changes, target_changes, angle_changes;
    unsigned missing; /* BH_MISSING_...: such a change takes place, or the start-up, without a time
                       */
} bh_time_sum;

/* The steps that are summed. */
typedef struct {
    size_t count;
    const bh_time_step *steps;
} bh_time_steps;

/*
 * Sums.  Changes of one step run in parallel: the longest counts.  Tasks by shift or period are
 * counted on the scheduled time (beam / availability + changes, the tasks themselves in it): the
 * smallest counts n with n = ceil(scheduled(n) / period), found by iteration; a plan without any
 * step time has none of them.
 * `times` [1] (room for rules->task_count, may be NULL) gets how often each task takes place.
 * BH_EDOMAIN for NaN (where none is allowed) or a number out of its range, or when tasks take as
 * long as their own period so that they never end; out untouched on failure.
 */
BH_CHECKED bh_code bh_time_add_up(const bh_time_steps *steps, const bh_time_rules *rules,
                                  bh_time_sum *out, double *times, bh_error *err);

/* --- the same in the order of running --- */

typedef enum {
    BH_SPAN_START_UP,
    BH_SPAN_CHANGE, /* before a step */
    BH_SPAN_TASK,
    BH_SPAN_DATA,
    BH_SPAN_EMPTY,
    BH_SPAN_CONTINGENCY /* behind all */
} bh_span_kind;

typedef struct {
    bh_span_kind kind;
    unsigned changes; /* of BH_SPAN_CHANGE: the BH_MISSING_... bits of what changes */
    size_t step;      /* of a change, data, empty target; the next one of others */
    size_t task;      /* of BH_SPAN_TASK */
    int times;        /* [1] how often the task takes place here */
    double begin;     /* [h] on the clock, from the start */
    double clock;     /* [h] on the clock: of beam, hours / availability */
    double hours;     /* [h] of beam, or of the change */
    double done;      /* [h] data or empty target of this step so far, this span among it */
} bh_time_span;

typedef struct {
    size_t count;
    bh_time_span *spans;
    bh_time_sum sum;
} bh_time_layout;

/*
 * Lays out what bh_time_add_up sums: each change before its step, tasks `once` first, those by
 * energy, particle, target, setting behind the change and before the data, those by shift or period
 * when it begins (behind the start-up, a change or a task that is then under way; data are
 * interrupted).  The last clock time is the scheduled time, then comes the contingency.  Spans
 * belong to `arena`.  BH_ENOMEM; else as bh_time_add_up.
 */
BH_CHECKED bh_code bh_time_lay_out(const bh_time_steps *steps, const bh_time_rules *rules,
                                   bh_arena *arena, bh_time_layout *out, bh_error *err);

/* What changes before step `at` (bits BH_MISSING_...), and in `hours` [h] how long that takes. */
unsigned bh_time_changes(const bh_time_steps *steps, const bh_time_rules *rules, size_t at,
                         double *hours);

#endif
