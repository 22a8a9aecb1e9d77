/* stepwise.c - one setting at a time, each kept under what it depends on. */
#include "beamhours/run/stepwise.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/base/crew.h"
#include "beamhours/run/setting_key.h"
#include "beamhours/run/totals.h"

enum { BUCKETS = 4096, KEEP_FOR = 8 };

/* Rows of one setting; its remarks apart, to be added to those of the others. */
struct bh_result {
    bh_result *next;
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
    bh_result *buckets[BUCKETS];
    unsigned generation;
    size_t evaluated;
};

struct bh_stepwise {
    const bh_plan *plan;
    bh_arena *arena;
    bh_results *results;
    bh_evaluator first, *hands;      /* of each thread */
    bh_arena *arenas[BH_MOST_HANDS]; /* theirs: evaluating takes from them */
    bh_setting_source *sources;
    const bh_result **known; /* of each setting, or NULL */
    bh_result *loose;        /* those without a key */
};

bh_results *bh_results_new(void)
{
    return calloc(1, sizeof(bh_results));
}

static void free_result(bh_result *r)
{
    bh_remarks_free(r->remarks);
    free(r->whole);
    free(r->bin);
    free(r->lines);
    free(r);
}

static void free_chain(bh_result *r)
{
    while (r) {
        bh_result *next = r->next;
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

static bh_result **place_of(bh_results *results, const bh_setting_key *key)
{
    bh_result **r = &results->buckets[key->word[1] % BUCKETS];
    while (*r && memcmp(&(*r)->key, key, sizeof *key) != 0)
        r = &(*r)->next;
    return r;
}

/* What no table asked for in a while. */
static void forget_old(bh_results *results)
{
    for (size_t b = 0; b < BUCKETS; b++)
        for (bh_result **r = &results->buckets[b]; *r;) {
            bh_result *old = *r;
            if (results->generation - old->used <= KEEP_FOR) {
                r = &old->next;
                continue;
            }
            *r = old->next;
            free_result(old);
        }
}

static bool keyed(const bh_setting_key *key)
{
    return key->word[0] || key->word[1];
}

/* Rows without changes of rates are not those with them. */
static bool find_sources(bh_stepwise *s)
{
    if (!bh_setting_sources(s->plan, s->arena, s->sources))
        return false;
    for (size_t i = 0; s->first.yielder.without_changes && i < s->plan->setting_count; i++)
        if (keyed(&s->sources[i].key))
            s->sources[i].key.word[0] = ~s->sources[i].key.word[0];
    return true;
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
        s->hands = &s->first;
        s->first.yielder = (bh_yielder){.workspace = how->workspace,
                                        .cancelled = how->cancelled,
                                        .asker = how->asker,
                                        .without_changes = how->without_changes};
        if (s->sources && s->known && find_sources(s) &&
            !bh_evaluator_prepare(&s->first, plan, s->arena, err))
            return s;
    }
    bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_stepwise_free(s);
    return NULL;
}

bh_code bh_stepwise_hands(bh_stepwise *steps, bh_workspace *const *workspaces, size_t count,
                          bh_error *err)
{
    bh_evaluator *hands = bh_arena_take(steps->arena, count + 1, sizeof *hands);
    if (!hands || count > BH_MOST_HANDS)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_code code = BH_OK;
    for (size_t i = 0; !code && i < count; i++) {
        steps->arenas[i] = steps->arenas[i] ? steps->arenas[i] : bh_arena_new();
        if (!steps->arenas[i])
            return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        hands[i].yielder = (bh_yielder){.workspace = workspaces[i],
                                        .cancelled = steps->first.yielder.cancelled,
                                        .asker = steps->first.yielder.asker,
                                        .without_changes = steps->first.yielder.without_changes};
        code = bh_evaluator_prepare(&hands[i], steps->plan, steps->arenas[i], err);
    }
    if (!code && count)
        steps->hands = hands;
    return code;
}

void bh_stepwise_free(bh_stepwise *steps)
{
    if (!steps)
        return;
    free_chain(steps->loose);
    for (size_t i = 0; i < BH_MOST_HANDS; i++)
        bh_arena_free(steps->arenas[i]);
    bh_arena_free(steps->arena);
    free(steps);
}

/* Remarks tell lines of the file: those of a part that moved move with it. */
static void move_remarks(bh_result *r, const bh_setting_source *source)
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

/* Rows say where they stand in the plan: that may be another place now. */
static void number_rows(bh_result *r, size_t setting)
{
    for (size_t i = 0; i < r->arms; i++)
        r->whole[i].setting = setting;
    for (size_t i = 0; r->bin && i < r->bins; i++)
        r->bin[i].setting = setting;
}

bool bh_stepwise_recall(bh_stepwise *steps, size_t setting, bool bins)
{
    const bh_setting_key *key = &steps->sources[setting].key;
    bh_result *r = keyed(key) ? *place_of(steps->results, key) : NULL;
    if (!r || (bins && !r->bin))
        return false;
    r->used = steps->results->generation;
    number_rows(r, setting);
    move_remarks(r, &steps->sources[setting]);
    steps->known[setting] = r;
    return true;
}

static bh_result *lay_out(const bh_setting *setting, size_t number, bool bins)
{
    bh_result *r = calloc(1, sizeof *r);
    if (!r)
        return NULL;
    r->arms = setting->arm_count;
    for (size_t a = 0; a < r->arms; a++)
        r->bins += (size_t)setting->arms[a].arm.bins;
    r->whole = calloc(r->arms ? r->arms : 1, sizeof *r->whole);
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

/* It goes where it belongs, in the place of one without bins. */
void bh_stepwise_take(bh_stepwise *steps, size_t setting, bh_result *result)
{
    bh_result **place =
        keyed(&result->key) ? place_of(steps->results, &result->key) : &steps->loose;
    result->used = steps->results->generation;
    if (keyed(&result->key) && *place) {
        bh_result *old = *place;
        result->next = old->next;
        free_result(old);
    } else {
        result->next = *place;
    }
    *place = result;
    steps->known[setting] = result;
    steps->results->evaluated++;
}

static bool copy_source(bh_result *r, const bh_setting_source *source)
{
    r->key = source->key;
    r->line_count = source->count;
    r->lines = calloc(source->count + 1, sizeof *r->lines);
    if (r->lines)
        memcpy(r->lines, source->lines, source->count * sizeof *r->lines);
    return r->lines != NULL;
}

bh_code bh_stepwise_compute(const bh_stepwise *steps, const bh_step *step, bh_result **out,
                            bh_error *err)
{
    bh_result *r = lay_out(&steps->plan->settings[step->setting], step->setting, step->bins);
    *out = NULL;
    if (r && !copy_source(r, &steps->sources[step->setting])) {
        free_result(r);
        r = NULL;
    }
    if (!r)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_evaluator *hand = &steps->hands[step->hand];
    bh_setting_rows rows = {.whole = r->whole, .bins = r->bin};
    hand->yielder.remarks = r->remarks;
    const bh_code code = bh_setting_evaluate(hand, step->setting, &rows, err);
    hand->yielder.remarks = NULL;
    if (code) {
        free_result(r);
        return code;
    }
    r->hours = (bh_stretch){.full = rows.full, .empty = rows.empty};
    *out = r;
    return BH_OK;
}

bh_code bh_stepwise_evaluate(bh_stepwise *steps, size_t setting, bool bins, bh_error *err)
{
    bh_result *r = NULL;
    const bh_code code =
        bh_stepwise_compute(steps, &(bh_step){.setting = setting, .bins = bins}, &r, err);
    if (r)
        bh_stepwise_take(steps, setting, r);
    return code;
}

bh_setting_rows bh_stepwise_rows(const bh_stepwise *steps, size_t setting)
{
    const bh_result *r = steps->known[setting];
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
