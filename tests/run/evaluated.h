/* evaluated.h - a plan written as text, read and evaluated, for the tests of the run room. */
#ifndef TESTS_RUN_EVALUATED_H
#define TESTS_RUN_EVALUATED_H

#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/run/explain.h"
#include "beamhours/run/table.h"

/* A plan with all that came of it; given back with done(). */
struct evaluated {
    bh_material_library *library;
    bh_diags *diags;
    bh_plan *plan;
    bh_table *table;
};

static inline void print_diags(const bh_diags *diags)
{
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        fprintf(stderr, "%d:%d: %s: %s\n", d->at.line, d->at.column, d->key, d->text);
    }
}

/* Reads a plan; the test fails where it has an error. */
static inline struct evaluated read_text(const char *text)
{
    static const char *const folders[] = {"materials", NULL};
    struct evaluated e = {.library = bh_material_library_new(folders), .diags = bh_diags_new()};
    e.plan = bh_plan_read(text, strlen(text), "plan.yaml", NULL, 0, e.library, e.diags);
    if (!e.plan)
        print_diags(e.diags);
    ck_assert_ptr_nonnull(e.plan);
    return e;
}

static inline struct evaluated evaluate_with(const char *text, const bh_evaluation *how)
{
    struct evaluated e = read_text(text);
    bh_error err = {.code = BH_OK};
    e.table = bh_table_new(e.plan, how, e.diags, &err);
    ck_assert_msg(e.table != NULL, "%s", err.text);
    return e;
}

/* With the rows of bins too. */
static inline struct evaluated evaluate(const char *text)
{
    return evaluate_with(text, &(bh_evaluation){.bins = true});
}

static inline void done(struct evaluated *e)
{
    bh_table_free(e->table);
    bh_plan_free(e->plan);
    bh_diags_free(e->diags);
    bh_material_library_free(e->library);
}

/* A number of a row of arms. */
static inline double cell(const struct evaluated *e, size_t row, bh_column_id column)
{
    return bh_table_number(e->table, false, row, column);
}

static inline double bin_cell(const struct evaluated *e, size_t row, bh_column_id column)
{
    return bh_table_number(e->table, true, row, column);
}

/* Whether some warning has these words. */
static inline bool warns(const struct evaluated *e, const char *words)
{
    const bh_diags *w = bh_table_warnings(e->table);
    for (size_t i = 0; i < bh_diags_count(w); i++)
        if (strstr(bh_diags_at(w, i)->text, words))
            return true;
    return false;
}

#define ck_assert_relative(got, wanted, tolerance, what)                                     \
    do {                                                                                     \
        const double g_ = (got), w_ = (wanted);                                              \
        ck_assert_msg(fabs(g_ - w_) <= (tolerance)*fabs(w_), "%s: %.12g, wanted %.12g (%g)", \
                      (what), g_, w_, (double)(tolerance));                                  \
    } while (0)

#endif
