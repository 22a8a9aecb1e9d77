/* stepwise.c - one setting at a time, each kept under what it depends on. */
#include "beamhours/run/stepwise.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/run/setting_key.h"
#include "beamhours/run/totals.h"

enum { BUCKETS = 4096, KEEP_FOR = 8 };

/* Rows of one setting; its remarks apart, to be added to those of the others. */
struct result {
    struct result *next;
    bh_setting_key key;
    size_t line_count;
    bh_lines *lines; /* where what it follows from stood in the file */
    unsigned used;   /* generation in which it was last of use */
    size_t arms, bins;
    bh_row *whole, *bin; /* bin NULL: not evaluated */
    bh_stretch hours;
    bh_remarks *remarks;
};

struct bh_results {
    struct result *buckets[BUCKETS];
    unsigned generation;
    size_t evaluated;
};

struct bh_stepwise {
    const bh_plan *plan;
    bh_arena *arena;
    bh_results *results;
    bh_evaluator evaluator;
    bh_setting_source *sources;
    const struct result **known; /* of each setting, or NULL */
    struct result *loose;        /* those without a key */
};

bh_results *bh_results_new(void)
{
    return calloc(1, sizeof(bh_results));
}

static void free_result(struct result *r)
{
    bh_remarks_free(r->remarks);
    free(r->whole);
    free(r->bin);
    free(r->lines);
    free(r);
}

static void free_chain(struct result *r)
{
    while (r) {
        struct result *next = r->next;
        free_result(r);
        r = next;
    }
}

void bh_results_free(bh_results *results)
{
    for (size_t b = 0; results && b < BUCKETS; b++)
        free_chain(results->buckets[b]);
    free(results);
}

size_t bh_results_evaluated(const bh_results *results)
{
    return results->evaluated;
}

static struct result **place_of(bh_results *results, const bh_setting_key *key)
{
    struct result **r = &results->buckets[key->word[1] % BUCKETS];
    while (*r && memcmp(&(*r)->key, key, sizeof *key) != 0)
        r = &(*r)->next;
    return r;
}

/* What no table asked for in a while. */
static void forget_old(bh_results *results)
{
    for (size_t b = 0; b < BUCKETS; b++)
        for (struct result **r = &results->buckets[b]; *r;) {
            struct result *old = *r;
            if (results->generation - old->used <= KEEP_FOR) {
                r = &old->next;
                continue;
            }
            *r = old->next;
            free_result(old);
        }
}

bh_stepwise *bh_stepwise_new(const bh_plan *plan, const bh_evaluation *how, bh_results *results,
                             bh_error *err)
{
    bh_stepwise *s = calloc(1, sizeof *s);
    if (s)
        s->arena = bh_arena_new();
    if (s && s->arena) {
        s->plan = plan;
        s->results = results;
        results->generation++;
        forget_old(results);
        s->sources = bh_arena_take(s->arena, plan->setting_count + 1, sizeof *s->sources);
        s->known = bh_arena_take(s->arena, plan->setting_count + 1, sizeof(void *));
        s->evaluator.yielder = (bh_yielder){
            .workspace = how->workspace, .cancelled = how->cancelled, .asker = how->asker};
        if (s->sources && s->known && bh_setting_sources(plan, s->arena, s->sources) &&
            !bh_evaluator_prepare(&s->evaluator, plan, s->arena, err))
            return s;
    }
    bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_stepwise_free(s);
    return NULL;
}

void bh_stepwise_free(bh_stepwise *steps)
{
    if (!steps)
        return;
    free_chain(steps->loose);
    bh_arena_free(steps->arena);
    free(steps);
}

/* Remarks tell lines of the file: those of a part that moved move with it. */
static void move_remarks(struct result *r, const bh_setting_source *source)
{
    for (size_t i = 0; i < r->line_count && i < source->count; i++) {
        const int by = source->lines[i].from - r->lines[i].from;
        if (by && r->lines[i].from)
            bh_remarks_move(r->remarks, r->lines[i].from, r->lines[i].to, by);
    }
    bh_remarks_moved(r->remarks);
    for (size_t i = 0; i < r->line_count && i < source->count; i++)
        r->lines[i] = source->lines[i];
}

static bool keyed(const bh_setting_key *key)
{
    return key->word[0] || key->word[1];
}

/* Rows say where they stand in the plan: that may be another place now. */
static void number_rows(struct result *r, size_t setting)
{
    for (size_t i = 0; i < r->arms; i++)
        r->whole[i].setting = setting;
    for (size_t i = 0; r->bin && i < r->bins; i++)
        r->bin[i].setting = setting;
}

bool bh_stepwise_recall(bh_stepwise *steps, size_t setting, bool bins)
{
    const bh_setting_key *key = &steps->sources[setting].key;
    struct result *r = keyed(key) ? *place_of(steps->results, key) : NULL;
    if (!r || (bins && !r->bin))
        return false;
    r->used = steps->results->generation;
    number_rows(r, setting);
    move_remarks(r, &steps->sources[setting]);
    steps->known[setting] = r;
    return true;
}

static struct result *lay_out(const bh_setting *setting, size_t number, bool bins)
{
    struct result *r = calloc(1, sizeof *r);
    if (!r)
        return NULL;
    r->arms = setting->arm_count;
    for (size_t a = 0; a < r->arms; a++)
        r->bins += (size_t)setting->arms[a].arm.bins;
    r->whole = calloc(r->arms + 1, sizeof *r->whole);
    r->bin = bins ? calloc(r->bins + 1, sizeof *r->bin) : NULL;
    r->remarks = bh_remarks_new();
    if (!r->whole || (bins && !r->bin) || !r->remarks) {
        free_result(r);
        return NULL;
    }
    bh_row *bin = r->bin;
    for (size_t a = 0; a < r->arms; a++) {
        r->whole[a] = (bh_row){.setting = number, .arm = a};
        for (int b = 1; bin && b <= setting->arms[a].arm.bins; b++, bin++)
            *bin = (bh_row){.setting = number, .arm = a, .bin = b};
    }
    return r;
}

/* Puts it where it belongs, in the place of one without bins. */
static void store(bh_stepwise *steps, size_t setting, struct result *r)
{
    const bh_setting_source *source = &steps->sources[setting];
    r->key = source->key;
    memcpy(r->lines, source->lines, source->count * sizeof *r->lines);
    r->line_count = source->count;
    r->used = steps->results->generation;
    struct result **place = keyed(&r->key) ? place_of(steps->results, &r->key) : &steps->loose;
    if (keyed(&r->key) && *place) {
        struct result *old = *place;
        r->next = old->next;
        free_result(old);
    } else {
        r->next = *place;
    }
    *place = r;
    steps->known[setting] = r;
}

bh_code bh_stepwise_evaluate(bh_stepwise *steps, size_t setting, bool bins, bh_error *err)
{
    struct result *r = lay_out(&steps->plan->settings[setting], setting, bins);
    if (r)
        r->lines = calloc(steps->sources[setting].count + 1, sizeof *r->lines);
    if (r && !r->lines) {
        free_result(r);
        r = NULL;
    }
    if (!r)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_setting_rows rows = {.whole = r->whole, .bins = r->bin};
    steps->evaluator.yielder.remarks = r->remarks;
    const bh_code code = bh_setting_evaluate(&steps->evaluator, setting, &rows, err);
    steps->evaluator.yielder.remarks = NULL;
    if (code) {
        free_result(r);
        return code;
    }
    r->hours = (bh_stretch){.full = rows.full, .empty = rows.empty};
    steps->results->evaluated++;
    store(steps, setting, r);
    return BH_OK;
}

bh_setting_rows bh_stepwise_rows(const bh_stepwise *steps, size_t setting)
{
    const struct result *r = steps->known[setting];
    return r ? (bh_setting_rows){.whole = r->whole,
                                 .bins = r->bin,
                                 .full = r->hours.full,
                                 .empty = r->hours.empty}
             : (bh_setting_rows){.whole = NULL};
}

bh_code bh_stepwise_conclude(bh_stepwise *steps, const bh_diags *said, bh_arena *arena,
                             bh_conclusion *out, bh_error *err)
{
    const size_t count = steps->plan->setting_count;
    bh_stretch *hours = bh_arena_take(steps->arena, count + 1, sizeof *hours);
    bh_remarks *remarks = bh_remarks_new();
    bh_code code =
        hours && remarks ? BH_OK : bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    for (size_t s = 0; !code && hours && s < count; s++) {
        hours[s] = steps->known[s]->hours;
        bh_remarks_add(remarks, steps->known[s]->remarks, steps->plan->file);
    }
    if (!code)
        code = bh_totals_from_plan(steps->plan, hours, arena, &out->totals, err);
    if (!code)
        code = bh_conclude(steps->plan, remarks, said, arena, out);
    bh_remarks_free(remarks);
    return code;
}
