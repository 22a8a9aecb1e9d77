/* remarks_words.c - what is kept of remarks, in sentences. */
#include <math.h>
#include <stdio.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/run/remarks_parts.h"

struct words {
    char low[BH_NUMBER_SIZE], high[BH_NUMBER_SIZE]; /* numbers of the remark as text */
    char from[BH_NUMBER_SIZE], to[BH_NUMBER_SIZE];
    char where[2 * BH_REMARK_TEXT]; /* "K1", "K1 and 3 more settings" */
};

static void put_in_words(const bh_kept_remark *k, struct words *w)
{
    bh_number_digits(k->remark.low, 3, w->low, sizeof w->low);
    bh_number_digits(k->remark.high, 3, w->high, sizeof w->high);
    bh_number_print(k->remark.from, w->from, sizeof w->from);
    bh_number_print(k->remark.to, w->to, sizeof w->to);
    if (k->settings > 1)
        snprintf(w->where, sizeof w->where, "%s and %d more setting%s", k->text[BH_KEPT_SETTING],
                 k->settings - 1, k->settings > 2 ? "s" : "");
    else
        snprintf(w->where, sizeof w->where, "%s", k->text[BH_KEPT_SETTING]);
}

/* What brings a recorded rate under its limit. */
static int prescale_for(const bh_remark *r)
{
    const double needed = r->high / r->from;
    return needed < 1e9 ? (int)needed + 1 : 1000000000;
}

/* The background that is a lower limit, and the cut that would leave it none. */
static void say_left_out(const bh_kept_remark *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    char cut[BH_NUMBER_SIZE];
    if (!(r->low > 0)) {
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_NOT_COMPUTED,
                     k->text[BH_KEPT_WHO], w->where, k->text[BH_KEPT_WHAT]);
        return;
    }
    bh_number_digits(floor(95 * r->low) / 100, 2, cut, sizeof cut);
    bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY],
                 BH_WARN_NOT_COMPUTED_BEGINS, k->text[BH_KEPT_WHO], w->where, k->text[BH_KEPT_WHAT],
                 w->low, cut);
}

static void say_model(const bh_kept_remark *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    switch (r->kind) {
    case BH_REMARK_RANGE:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_MODEL_RANGE,
                     k->text[BH_KEPT_WHAT], k->text[BH_KEPT_WHO], w->from, w->to, w->where, w->low,
                     w->high);
        break;
    case BH_REMARK_FLAGGED:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_MODEL_FLAGGED,
                     k->text[BH_KEPT_WHO], k->text[BH_KEPT_WHAT]);
        break;
    case BH_REMARK_NOT_COMPUTED:
        say_left_out(k, w, diags);
        break;
    case BH_REMARK_WIDE_CUT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_CUT_WIDE,
                     k->text[BH_KEPT_WHO], w->high, w->where);
        break;
    case BH_REMARK_NO_CUT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_NO_CUT,
                     k->text[BH_KEPT_WHO], w->where);
        break;
    case BH_REMARK_RECOIL_CUT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_RECOIL_CUT,
                     k->text[BH_KEPT_WHO], w->where);
        break;
    case BH_REMARK_OTHERS:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_OTHERS,
                     k->text[BH_KEPT_WHO], w->where, k->text[BH_KEPT_WHAT]);
        break;
    case BH_REMARK_RADIATION:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], "%s",
                     k->text[BH_KEPT_WHAT]);
        break;
    case BH_REMARK_CAVEAT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY],
                     BH_WARN_PROCESS_CAVEAT, w->where, k->text[BH_KEPT_WHAT]);
        break;
    default:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_PLANE_WAVES,
                     k->text[BH_KEPT_WHO], w->high, w->where);
    }
}

/* Where the beam or what it scatters does not come through. */
static void say_passage(const bh_kept_remark *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    switch (r->kind) {
    case BH_REMARK_BEAM_STOPS:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_BEAM_STOPS,
                     k->text[BH_KEPT_WHAT], w->where);
        break;
    case BH_REMARK_STOPS_BEHIND:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_STOPS_BEHIND,
                     k->text[BH_KEPT_WHAT], w->where);
        break;
    case BH_REMARK_STAYS_INSIDE:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_STAYS_INSIDE,
                     k->text[BH_KEPT_WHO], w->where);
        break;
    case BH_REMARK_NOT_SLOWED:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_NOT_SLOWED,
                     k->text[BH_KEPT_WHAT]);
        break;
    default:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_LIQUID,
                     k->text[BH_KEPT_WHAT], w->high);
    }
}

static void say(const bh_kept_remark *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    switch (r->kind) {
    case BH_REMARK_NO_EMPTY:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY],
                     BH_WARN_NO_EMPTY_TARGET, k->text[BH_KEPT_WHO]);
        break;
    case BH_REMARK_LIMIT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_RATE_LIMIT,
                     k->text[BH_KEPT_WHO], w->high, w->from, w->where, prescale_for(r));
        break;
    case BH_REMARK_DEAD:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_DEAD,
                     k->text[BH_KEPT_WHO], w->low, w->where);
        break;
    case BH_REMARK_BIN_TOO_SLOW:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_BIN_TOO_SLOW,
                     k->text[BH_KEPT_WHAT], k->text[BH_KEPT_WHO], w->high, w->from);
        break;
    case BH_REMARK_NOT_CONVERGED:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_NOT_CONVERGED,
                     k->text[BH_KEPT_WHO], w->where);
        break;
    case BH_REMARK_NO_SIGNAL:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->text[BH_KEPT_KEY], BH_WARN_NO_SIGNAL,
                     k->text[BH_KEPT_WHAT], k->text[BH_KEPT_WHO], w->where);
        break;
    case BH_REMARK_BEAM_STOPS:
    case BH_REMARK_STOPS_BEHIND:
    case BH_REMARK_STAYS_INSIDE:
    case BH_REMARK_NOT_SLOWED:
    case BH_REMARK_LIQUID:
        say_passage(k, w, diags);
        break;
    default:
        say_model(k, w, diags);
    }
}

bool bh_remarks_say(const bh_remarks *remarks, bh_diags *diags)
{
    for (size_t i = 0; i < remarks->count; i++) {
        struct words w;
        put_in_words(&remarks->list[i], &w);
        say(&remarks->list[i], &w, diags);
    }
    return !remarks->failed;
}
