/* remarks.c - warnings of an evaluation, each said once however many settings it concerns. */
#include "beamhours/run/remarks.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"

enum { TEXT = 240, LONG = 480, FIRST_ROOM = 4 };

struct kept {
    bh_remark remark;                                                 /* its texts point below */
    char key[TEXT], who[TEXT], what[LONG], setting[TEXT], last[TEXT]; /* own copies */
    char plain[TEXT];                                                 /* the key as it was noted */
    int settings;
    bool moved;
};

struct bh_remarks {
    size_t count, room;
    struct kept *list;
    bool failed;
};

bh_remarks *bh_remarks_new(void)
{
    return calloc(1, sizeof(bh_remarks));
}

void bh_remarks_free(bh_remarks *remarks)
{
    if (remarks)
        free(remarks->list);
    free(remarks);
}

static bool of_the_whole_plan(bh_remark_kind kind)
{
    return kind <= BH_REMARK_DEAD;
}

static const char *or_empty(const char *text)
{
    return text ? text : "";
}

/* One line for a cause, whatever the nuclides. */
static bool joins(bh_remark_kind kind)
{
    return kind == BH_REMARK_NOT_COMPUTED || kind == BH_REMARK_FLAGGED || kind == BH_REMARK_RANGE;
}

static bool same_place(const bh_remark *a, const bh_remark *b)
{
    return of_the_whole_plan(a->kind) || (a->at.line == b->at.line && a->at.column == b->at.column);
}

static bool same(const struct kept *k, const bh_remark *r)
{
    if (k->remark.kind != r->kind || strcmp(k->what, or_empty(r->what)) != 0)
        return false;
    if (k->remark.from != r->from && r->kind <= BH_REMARK_DEAD) /* another limit or range */
        return false;
    return joins(r->kind) || (strcmp(k->who, or_empty(r->who)) == 0 && same_place(&k->remark, r));
}

static void copy(char to[TEXT], const char *from)
{
    snprintf(to, TEXT, "%s", or_empty(from));
}

/* Adds a name to a list of them, unless it is there or there is no room. */
static void join(char list[TEXT], const char *name)
{
    const char *found = strstr(list, name);
    const size_t used = strlen(list);
    const bool there = found && (found == list || found[-1] == ' ') &&
                       (found[strlen(name)] == ',' || !found[strlen(name)]);
    if (!there && used + strlen(name) + 3 < TEXT)
        snprintf(list + used, TEXT - used, ", %s", name);
}

static void widen(struct kept *k, const bh_remark *r)
{
    if (joins(r->kind))
        join(k->who, or_empty(r->who));
    if (r->low < k->remark.low)
        k->remark.low = r->low;
    if (r->high > k->remark.high)
        k->remark.high = r->high;
    if (strcmp(k->last, or_empty(r->setting)) == 0)
        return;
    copy(k->last, r->setting);
    k->settings++;
}

static bool grow(bh_remarks *remarks)
{
    if (remarks->count < remarks->room)
        return true;
    const size_t room = remarks->room ? 2 * remarks->room : FIRST_ROOM;
    struct kept *list = realloc(remarks->list, room * sizeof *list);
    if (!list)
        return false;
    remarks->list = list;
    remarks->room = room;
    return true;
}

/* The dotted path of the key meant, with the name of what it belongs to. */
static void set_key(char to[TEXT], const bh_remark *r)
{
    switch (r->kind) {
    case BH_REMARK_WIDE_CUT:
    case BH_REMARK_NO_CUT:
    case BH_REMARK_RECOIL_CUT:
    case BH_REMARK_RADIATION:
    case BH_REMARK_LIMIT:
    case BH_REMARK_DEAD:
        snprintf(to, TEXT, "arms.%s.%s", or_empty(r->who), r->key);
        break;
    case BH_REMARK_NO_EMPTY:
    case BH_REMARK_BEAM_STOPS:
    case BH_REMARK_STOPS_BEHIND:
    case BH_REMARK_NOT_SLOWED:
    case BH_REMARK_LIQUID:
        snprintf(to, TEXT, "targets.%s.%s", or_empty(r->who), r->key);
        break;
    case BH_REMARK_BIN_TOO_SLOW:
        snprintf(to, TEXT, "settings.%s.%s", or_empty(r->setting), r->key);
        break;
    case BH_REMARK_NOT_CONVERGED:
    case BH_REMARK_NO_SIGNAL:
    case BH_REMARK_STAYS_INSIDE:
        snprintf(to, TEXT, "%s.%s", r->key, or_empty(r->setting));
        break;
    default:
        copy(to, r->key);
    }
}

void bh_remarks_note(bh_remarks *remarks, const bh_remark *remark)
{
    for (size_t i = remarks->count; i-- > 0;) /* the newest is the likeliest */
        if (same(&remarks->list[i], remark)) {
            widen(&remarks->list[i], remark);
            return;
        }
    if (!grow(remarks)) {
        remarks->failed = true;
        return;
    }
    struct kept *k = &remarks->list[remarks->count++];
    *k = (struct kept){.remark = *remark, .settings = 1};
    set_key(k->key, remark);
    copy(k->plain, remark->key);
    copy(k->who, remark->who);
    snprintf(k->what, LONG, "%s", or_empty(remark->what));
    copy(k->setting, remark->setting);
    copy(k->last, remark->setting);
}

/* One of another list: its names one by one, its settings all. */
static void add_kept(bh_remarks *remarks, const struct kept *from, const char *file)
{
    bh_remark r = from->remark;
    char who[TEXT];
    copy(who, from->who);
    if (r.at.file)
        r.at.file = file;
    r.what = from->what;
    r.setting = from->setting;
    r.key = from->plain;
    for (char *name = who; name;) {
        char *comma = joins(r.kind) ? strstr(name, ", ") : NULL;
        if (comma)
            *comma = '\0';
        r.who = name;
        bh_remarks_note(remarks, &r);
        name = comma ? comma + 2 : NULL;
    }
    for (size_t i = remarks->count; i-- > 0;)
        if (same(&remarks->list[i], &r)) {
            remarks->list[i].settings += from->settings - 1;
            copy(remarks->list[i].last, from->last);
            return;
        }
}

void bh_remarks_add(bh_remarks *remarks, const bh_remarks *from, const char *file)
{
    for (size_t i = 0; i < from->count; i++)
        add_kept(remarks, &from->list[i], file);
    remarks->failed = remarks->failed || from->failed;
}

void bh_remarks_move(bh_remarks *remarks, int from, int to, int by)
{
    for (size_t i = 0; i < remarks->count; i++) {
        struct kept *k = &remarks->list[i];
        if (k->moved || k->remark.at.line < from || k->remark.at.line > to)
            continue;
        k->remark.at.line += by;
        k->moved = true;
    }
}

void bh_remarks_moved(bh_remarks *remarks)
{
    for (size_t i = 0; i < remarks->count; i++)
        remarks->list[i].moved = false;
}

struct words {
    char low[BH_NUMBER_SIZE], high[BH_NUMBER_SIZE]; /* numbers of the remark as text */
    char from[BH_NUMBER_SIZE], to[BH_NUMBER_SIZE];
    char where[2 * TEXT]; /* "K1", "K1 and 3 more settings" */
};

static void put_in_words(const struct kept *k, struct words *w)
{
    bh_number_digits(k->remark.low, 3, w->low, sizeof w->low);
    bh_number_digits(k->remark.high, 3, w->high, sizeof w->high);
    bh_number_print(k->remark.from, w->from, sizeof w->from);
    bh_number_print(k->remark.to, w->to, sizeof w->to);
    if (k->settings > 1)
        snprintf(w->where, sizeof w->where, "%s and %d more setting%s", k->setting, k->settings - 1,
                 k->settings > 2 ? "s" : "");
    else
        snprintf(w->where, sizeof w->where, "%s", k->setting);
}

/* What brings a recorded rate under its limit. */
static int prescale_for(const bh_remark *r)
{
    const double needed = r->high / r->from;
    return needed < 1e9 ? (int)needed + 1 : 1000000000;
}

/* The background that is a lower limit, and the cut that would leave it none. */
static void say_left_out(const struct kept *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    char cut[BH_NUMBER_SIZE];
    if (!(r->low > 0)) {
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_NOT_COMPUTED, k->who,
                     w->where, k->what);
        return;
    }
    bh_number_digits(floor(95 * r->low) / 100, 2, cut, sizeof cut);
    bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_NOT_COMPUTED_BEGINS, k->who,
                 w->where, k->what, w->low, cut);
}

static void say_model(const struct kept *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    switch (r->kind) {
    case BH_REMARK_RANGE:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_MODEL_RANGE, k->what,
                     k->who, w->from, w->to, w->where, w->low, w->high);
        break;
    case BH_REMARK_FLAGGED:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_MODEL_FLAGGED, k->who,
                     k->what);
        break;
    case BH_REMARK_NOT_COMPUTED:
        say_left_out(k, w, diags);
        break;
    case BH_REMARK_WIDE_CUT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_CUT_WIDE, k->who, w->high,
                     w->where);
        break;
    case BH_REMARK_NO_CUT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_NO_CUT, k->who, w->where);
        break;
    case BH_REMARK_RECOIL_CUT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_RECOIL_CUT, k->who,
                     w->where);
        break;
    case BH_REMARK_OTHERS:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_OTHERS, k->who, w->where,
                     k->what);
        break;
    case BH_REMARK_RADIATION:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, "%s", k->what);
        break;
    case BH_REMARK_CAVEAT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_PROCESS_CAVEAT, w->where,
                     k->what);
        break;
    default:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_PLANE_WAVES, k->who,
                     w->high, w->where);
    }
}

/* Where the beam or what it scatters does not come through. */
static void say_passage(const struct kept *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    switch (r->kind) {
    case BH_REMARK_BEAM_STOPS:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_BEAM_STOPS, k->what,
                     w->where);
        break;
    case BH_REMARK_STOPS_BEHIND:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_STOPS_BEHIND, k->what,
                     w->where);
        break;
    case BH_REMARK_STAYS_INSIDE:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_STAYS_INSIDE, k->who,
                     w->where);
        break;
    case BH_REMARK_NOT_SLOWED:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_NOT_SLOWED, k->what);
        break;
    default:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_LIQUID, k->what, w->high);
    }
}

static void say(const struct kept *k, const struct words *w, bh_diags *diags)
{
    const bh_remark *r = &k->remark;
    switch (r->kind) {
    case BH_REMARK_NO_EMPTY:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_NO_EMPTY_TARGET, k->who);
        break;
    case BH_REMARK_LIMIT:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_RATE_LIMIT, k->who, w->high,
                     w->from, w->where, prescale_for(r));
        break;
    case BH_REMARK_DEAD:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_DEAD, k->who, w->low,
                     w->where);
        break;
    case BH_REMARK_BIN_TOO_SLOW:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_BIN_TOO_SLOW, k->what,
                     k->who, w->high, w->from);
        break;
    case BH_REMARK_NOT_CONVERGED:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_NOT_CONVERGED, k->who,
                     w->where);
        break;
    case BH_REMARK_NO_SIGNAL:
        bh_diags_add(diags, BH_SEVERITY_WARNING, r->at, k->key, BH_WARN_NO_SIGNAL, k->what, k->who,
                     w->where);
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
