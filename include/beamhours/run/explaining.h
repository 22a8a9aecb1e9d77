/* explaining.h - an explanation while it is written: its lines, and what they are written from. */
#ifndef BH_RUN_EXPLAINING_H
#define BH_RUN_EXPLAINING_H

#include "beamhours/base/arena.h"
#include "beamhours/run/evaluate.h"
#include "beamhours/run/explain.h"
#include "beamhours/units/quantity.h"

/* Ratios to so many other rows are explained. */
enum { BH_EXPLAIN_RATIOS = 8 };

typedef struct {
    const bh_table *table;
    bh_arena *arena; /* of the lines and their texts */
    bh_line *lines;
    size_t count, room;
    bool failed; /* memory ran out */
    bh_evaluator evaluator;
    const bh_setting *setting;
    const bh_arm_hours *arm; /* of the evaluator */
    bh_setting_hours hours;
    int bin;
    const bh_part *part;
    bh_channel channel; /* the first of the main nuclide */
    bh_event event;     /* at the row's angle */
    bool reached;       /* there is such an event */
} bh_explaining;

/* Formats a text that lives as long as the lines; NULL (and failed) when memory runs out. */
const char *bh_explain_text(bh_explaining *x, const char *fmt, ...) BH_PRINTF(2, 3);

/* The number value [1] with 6 digits, and its unit: "4.2e+37 /cm2/s". */
const char *bh_explain_number(bh_explaining *x, double value, const char *unit);

/* The share [1] in per cent with 3 digits: "0.570 %". */
const char *bh_explain_percent(bh_explaining *x, double share);

/* "plan.yaml:14:12", or NULL where there is no place. */
const char *bh_explain_mark(bh_explaining *x, bh_mark at);

/* Adds a line; its texts must live as long as the lines. */
void bh_explain_add(bh_explaining *x, bh_line line);
void bh_explain_section(bh_explaining *x, const char *name);

/* How well the row's arm measures, where it matters. */
void bh_explain_resolution(bh_explaining *x);

/* The parts of an explanation, in their order. */
void bh_explain_inputs(bh_explaining *x);
void bh_explain_target(bh_explaining *x);
void bh_explain_cross_section(bh_explaining *x);
void bh_explain_rates(bh_explaining *x);
void bh_explain_pair(bh_explaining *x); /* in the place of rates, of a coincidence */
void bh_explain_time(bh_explaining *x);
void bh_explain_systematic(bh_explaining *x);

/* Lines of the signal on radiation. */
void bh_explain_radiation(bh_explaining *x);

/* "12C in layer 1 (kapton)". */
const char *bh_explain_place(bh_explaining *x, const bh_contribution *c);

/* The background, item by item: its lines add up to the last. `all` are the `count` contributions
 * of the row's part. */
void bh_explain_background(bh_explaining *x, const bh_contribution *all, size_t count);

void bh_explain_assumptions(bh_explaining *x);

#endif
