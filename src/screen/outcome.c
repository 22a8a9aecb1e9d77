/* outcome.c - counted by its users, in whatever thread they are. */
#include "beamhours/screen/outcome.h"

#include <stdlib.h>
#include <string.h>

bh_reading_of *bh_reading_of_new(const char *bytes, size_t length)
{
    bh_reading_of *r = calloc(1, sizeof *r);
    if (!r)
        return NULL;
    atomic_init(&r->users, 1U);
    r->bytes = malloc(length + 1);
    r->said = bh_diags_new();
    if (!r->bytes || !r->said) {
        bh_reading_of_leave(r);
        return NULL;
    }
    memcpy(r->bytes, bytes, length);
    r->bytes[length] = '\0';
    r->length = length;
    return r;
}

bh_reading_of *bh_reading_of_share(bh_reading_of *reading)
{
    if (reading)
        (void)atomic_fetch_add(&reading->users, 1U);
    return reading;
}

void bh_reading_of_leave(bh_reading_of *reading)
{
    if (!reading || atomic_fetch_sub(&reading->users, 1U) != 1)
        return;
    bh_plan_free(reading->plan);
    bh_diags_free(reading->said);
    free(reading->bytes);
    free(reading);
}

static bool lay_out(bh_outcome *o)
{
    const bh_plan *plan = o->of->plan;
    const size_t n = plan ? plan->setting_count : 0;
    o->setting_count = o->unknown = n;
    o->first_row = bh_arena_take(o->arena, n + 1, sizeof *o->first_row);
    o->first_bin = bh_arena_take(o->arena, n + 1, sizeof *o->first_bin);
    o->known = bh_arena_take(o->arena, n + 1, sizeof *o->known);
    o->bins_known = bh_arena_take(o->arena, n + 1, sizeof *o->bins_known);
    if (!o->first_row || !o->first_bin || !o->known || !o->bins_known)
        return false;
    for (size_t s = 0; s < n; s++) {
        o->first_row[s + 1] = o->first_row[s] + plan->settings[s].arm_count;
        o->first_bin[s + 1] = o->first_bin[s];
        for (size_t a = 0; a < plan->settings[s].arm_count; a++)
            o->first_bin[s + 1] += (size_t)plan->settings[s].arms[a].arm.bins;
    }
    o->row_count = o->first_row[n];
    o->bin_count = o->first_bin[n];
    o->rows = bh_arena_take(o->arena, o->row_count + 1, sizeof *o->rows);
    for (size_t s = 0; o->rows && s < n; s++)
        for (size_t a = 0; a < plan->settings[s].arm_count; a++) { /* the rest is 0 */
            o->rows[o->first_row[s] + a].setting = s;
            o->rows[o->first_row[s] + a].arm = a;
        }
    return o->rows != NULL;
}

bh_outcome *bh_outcome_new(bh_reading_of *reading, size_t job)
{
    bh_outcome *o = calloc(1, sizeof *o);
    if (!o)
        return NULL;
    atomic_init(&o->users, 1U);
    o->job = job;
    o->of = bh_reading_of_share(reading);
    o->arena = bh_arena_new();
    o->end.warnings = bh_diags_new();
    if (o->arena && o->end.warnings && lay_out(o))
        return o;
    bh_outcome_leave(o);
    return NULL;
}

bh_outcome *bh_outcome_share(bh_outcome *outcome)
{
    if (outcome)
        (void)atomic_fetch_add(&outcome->users, 1U);
    return outcome;
}

void bh_outcome_leave(bh_outcome *outcome)
{
    if (!outcome || atomic_fetch_sub(&outcome->users, 1U) != 1)
        return;
    bh_diags_free(outcome->end.warnings);
    bh_arena_free(outcome->arena);
    bh_reading_of_leave(outcome->of);
    free(outcome);
}

const bh_diags *bh_outcome_diags(const bh_outcome *outcome)
{
    return outcome->complete ? outcome->end.warnings : outcome->of->said;
}
