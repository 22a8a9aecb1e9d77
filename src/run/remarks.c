/* remarks.c - warnings of an evaluation, each said once however many settings it concerns. */
#include "beamhours/run/remarks_parts.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { TEXT = BH_REMARK_TEXT, LONG = BH_REMARK_LONG };

bh_remarks *bh_remarks_new(void)
{
    return calloc(1, sizeof(bh_remarks));
}

void bh_remarks_free(bh_remarks *remarks)
{
    for (size_t i = 0; remarks && i < remarks->count; i++)
        for (int k = 0; k < BH_KEPT_TEXTS; k++)
            free(remarks->list[i].text[k]);
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

static bool same(const bh_kept_remark *k, const bh_remark *r)
{
    if (k->remark.kind != r->kind || strcmp(k->text[BH_KEPT_WHAT], or_empty(r->what)) != 0)
        return false;
    if (k->remark.from != r->from && r->kind <= BH_REMARK_DEAD) /* another limit or range */
        return false;
    return joins(r->kind) ||
           (strcmp(k->text[BH_KEPT_WHO], or_empty(r->who)) == 0 && same_place(&k->remark, r));
}

static void copy(char to[TEXT], const char *from)
{
    snprintf(to, TEXT, "%s", or_empty(from));
}

/* The first bytes of `text`, in place of what is there; false without memory. */
static bool put(bh_kept_remark *k, int which, const char *text, size_t most)
{
    const size_t length = strnlen(or_empty(text), most - 1);
    if (length + 1 > k->size[which]) {
        char *more = realloc(k->text[which], length + 1);
        if (!more)
            return false;
        k->text[which] = more;
        k->size[which] = length + 1;
    }
    memcpy(k->text[which], or_empty(text), length);
    k->text[which][length] = '\0';
    return true;
}

/* Adds a name to those that a remark is on, unless it is there or there is no room. */
static bool join(bh_kept_remark *k, const char *name)
{
    const char *list = k->text[BH_KEPT_WHO], *found = strstr(list, name);
    const size_t used = strlen(list);
    const bool there = found && (found == list || found[-1] == ' ') &&
                       (found[strlen(name)] == ',' || !found[strlen(name)]);
    char longer[TEXT];
    if (there || used + strlen(name) + 3 >= TEXT)
        return true;
    snprintf(longer, sizeof longer, "%s, %s", list, name);
    return put(k, BH_KEPT_WHO, longer, TEXT);
}

static bool widen(bh_kept_remark *k, const bh_remark *r)
{
    if (joins(r->kind) && !join(k, or_empty(r->who)))
        return false;
    if (r->low < k->remark.low)
        k->remark.low = r->low;
    if (r->high > k->remark.high)
        k->remark.high = r->high;
    if (strcmp(k->text[BH_KEPT_LAST], or_empty(r->setting)) == 0)
        return true;
    k->settings++;
    return put(k, BH_KEPT_LAST, r->setting, TEXT);
}

static bool grow(bh_remarks *remarks)
{
    if (remarks->count < remarks->room)
        return true;
    const size_t room = remarks->room ? 2 * remarks->room : 1;
    bh_kept_remark *list = realloc(remarks->list, room * sizeof *list);
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

/* Fills the newest one. */
static bool fill(bh_kept_remark *k, const bh_remark *remark)
{
    char key[TEXT];
    *k = (bh_kept_remark){.remark = *remark, .settings = 1};
    set_key(key, remark);
    return put(k, BH_KEPT_KEY, key, TEXT) && put(k, BH_KEPT_PLAIN, remark->key, TEXT) &&
           put(k, BH_KEPT_WHO, remark->who, TEXT) && put(k, BH_KEPT_WHAT, remark->what, LONG) &&
           put(k, BH_KEPT_SETTING, remark->setting, TEXT) &&
           put(k, BH_KEPT_LAST, remark->setting, TEXT);
}

static void forget_newest(bh_remarks *remarks)
{
    bh_kept_remark *k = &remarks->list[--remarks->count];
    for (int i = 0; i < BH_KEPT_TEXTS; i++)
        free(k->text[i]);
}

void bh_remarks_note(bh_remarks *remarks, const bh_remark *remark)
{
    for (size_t i = remarks->count; i-- > 0;) /* the newest is the likeliest */
        if (same(&remarks->list[i], remark)) {
            remarks->failed = !widen(&remarks->list[i], remark) || remarks->failed;
            return;
        }
    if (!grow(remarks)) {
        remarks->failed = true;
        return;
    }
    if (fill(&remarks->list[remarks->count++], remark))
        return;
    forget_newest(remarks);
    remarks->failed = true;
}

/* One of another list: its names one by one, its settings all. */
static void add_kept(bh_remarks *remarks, const bh_kept_remark *from, const char *file)
{
    bh_remark r = from->remark;
    char who[TEXT];
    copy(who, from->text[BH_KEPT_WHO]);
    if (r.at.file)
        r.at.file = file;
    r.what = from->text[BH_KEPT_WHAT];
    r.setting = from->text[BH_KEPT_SETTING];
    r.key = from->text[BH_KEPT_PLAIN];
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
            remarks->failed =
                !put(&remarks->list[i], BH_KEPT_LAST, from->text[BH_KEPT_LAST], TEXT) ||
                remarks->failed;
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
        bh_kept_remark *k = &remarks->list[i];
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
