/* reading.h - a plan from a text, for the tests of this room. */
#ifndef TESTS_PLAN_READING_H
#define TESTS_PLAN_READING_H

#include <stdio.h>
#include <string.h>

#include "beamhours/plan/plan.h"

struct read {
    bh_material_library *library;
    bh_diags *diags;
    bh_plan *plan;
};

static inline struct read read_text(const char *text, const bh_change *changes, size_t count)
{
    static const char *const folders[] = {"tests/bad-plans", "materials", NULL};
    struct read r = {bh_material_library_new(folders), bh_diags_new(), NULL};
    r.plan = bh_plan_read(text, strlen(text), "plan.yaml", changes, count, r.library, r.diags);
    return r;
}

static inline void read_free(struct read *r)
{
    bh_plan_free(r->plan);
    bh_diags_free(r->diags);
    bh_material_library_free(r->library);
}

static inline void read_print(const struct read *r)
{
    for (size_t i = 0; i < bh_diags_count(r->diags); i++) {
        const bh_diag *d = bh_diags_at(r->diags, i);
        printf("    %s:%d:%d %s: %s%s\n", d->at.file ? d->at.file : "", d->at.line, d->at.column,
               d->key, d->severity == BH_SEVERITY_WARNING ? "(warning) " : "", d->text);
    }
}

#endif
