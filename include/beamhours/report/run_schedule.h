/* run_schedule.h - what to do when, for the wall of the counting room. */
#ifndef BH_REPORT_RUN_SCHEDULE_H
#define BH_REPORT_RUN_SCHEDULE_H

#include "beamhours/base/arena.h"
#include "beamhours/base/text.h"
#include "beamhours/rates/schedule.h"
#include "beamhours/run/table.h"

typedef struct {
    const bh_table *table;
    bh_time_layout layout;
    size_t *row; /* for each setting its first row of the table; one more: the number of rows */
    bool has_start;
    long long start;     /* minutes since 1970 began; with has_start */
    const char *version; /* of the program, for JSON */
} bh_run_schedule;

/* Lays the plan of `table` out on the clock; what is made belongs to `arena`.  Only table, layout
 * and row are set.  BH_ENOMEM. */
BH_CHECKED bh_code bh_run_schedule_make(const bh_table *table, bh_arena *arena,
                                        bh_run_schedule *out, bh_error *err);

/* Append it: one line for each stretch of time; of data one for each arm. */
void bh_run_schedule_text(const bh_run_schedule *s, int width, bh_text *out);
void bh_run_schedule_markdown(const bh_run_schedule *s, bh_text *out);
void bh_run_schedule_csv(const bh_run_schedule *s, bh_text *out);
BH_CHECKED bh_code bh_run_schedule_json(const bh_run_schedule *s, bh_text *out);

/* --- for these writers --- */

/* One line: a span, and of data one of its rows. */
typedef struct {
    const bh_time_span *span;
    const bh_setting *setting; /* of a change, data, empty target; NULL of others */
    size_t row;                /* of the table, of data and empty target */
    bool first;                /* line of its span */
} bh_run_line;

/* Calls `each` for every line in order. */
void bh_run_lines(const bh_run_schedule *s, void (*each)(void *to, const bh_run_line *line),
                  void *to);

/* "start-up", "change", "task", "data", "empty target", "contingency". */
const char *bh_span_name(bh_span_kind kind);

/* Appends what to do: a setting's or a task's name, "change: energy, angle". */
void bh_run_words(const bh_run_schedule *s, const bh_run_line *line, bh_text *out);

/* What to dial and where to stop; NAN where that means nothing.  Charge and counts are those of the
 * setting since it began, on this target. */
typedef struct {
    double energy, current; /* [MeV] kinetic; [uA] electrical, the whole beam's */
    double angle, momentum; /* [deg] [MeV/c] */
    int prescale;           /* [1] 0: none of its own */
    double charge, counts;  /* [mC] [1] */
} bh_run_values;

bh_run_values bh_run_values_of(const bh_run_schedule *s, const bh_run_line *line);

#endif
