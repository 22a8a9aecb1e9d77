/* selection.c - filters, orders and picks; the table itself is never touched. */
#include "beamhours/report/selection.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/sequence.h"

double bh_selection_number(const bh_selection *view, size_t i, int column)
{
    return bh_table_number(view->table, view->bins, view->rows[i], (bh_column_id)column);
}

const char *bh_selection_text(const bh_selection *view, size_t i, int column)
{
    return bh_table_text(view->table, view->bins, view->rows[i], (bh_column_id)column);
}

const char *bh_selection_reason(const bh_selection *view, size_t i, int column)
{
    return bh_table_reason(view->table, view->bins, view->rows[i], (bh_column_id)column);
}

/* The next piece of a comma list: its length; `list` moves behind the comma, NULL at the end. */
static size_t piece(const char **list, const char **start)
{
    *start = *list;
    const size_t length = strcspn(*list, ",");
    *list = (*list)[length] == ',' ? *list + length + 1 : NULL;
    return length;
}

static bh_code find_column(const char *key, size_t length, int *id, bh_error *err)
{
    char word[64];
    if (length == 0 || length >= sizeof word)
        return bh_fail(err, BH_EDOMAIN, "a column key is empty or too long: keys such as q2_GeV2");
    memcpy(word, key, length);
    word[length] = '\0';
    *id = bh_column_find(word);
    if (*id >= 0)
        return BH_OK;
    const char *near = bh_column_suggest(word);
    return near ? bh_fail(err, BH_EDOMAIN, "no column \"%s\"; did you mean %s?", word, near)
                : bh_fail(err, BH_EDOMAIN, "no column \"%s\"; `beamhours keys columns` lists them",
                          word);
}

static bh_code pick_columns(const char *list, bh_selection *view, bh_error *err)
{
    while (list) {
        const char *key = NULL;
        const size_t length = piece(&list, &key);
        int id = -1;
        const bh_code bad = find_column(key, length, &id, err);
        if (bad)
            return bad;
        if (view->column_count == BH_COLUMN_COUNT)
            return bh_fail(err, BH_EDOMAIN, "more columns than there are");
        view->columns[view->column_count++] = id;
    }
    return BH_OK;
}

/* "K3" names K3 and K3.1, K3.2 ... of its sweep. */
static bool names(const char *word, size_t length, const char *setting)
{
    if (strncmp(word, setting, length) != 0)
        return false;
    const char *rest = setting + length;
    return *rest == '\0' || (*rest == '.' && strspn(rest + 1, "0123456789") == strlen(rest + 1));
}

/* Names that would do, as many as fit: "low-1, low-2 ...". */
static void list_settings(const bh_plan *plan, char *out, size_t size)
{
    size_t used = 0;
    for (size_t i = 0; i < plan->setting_count; i++) {
        const char *name = plan->settings[i].name, *lead = i ? ", " : "";
        if (used + strlen(lead) + strlen(name) + 5 > size) {
            (void)snprintf(out + used, size - used, " ...");
            return;
        }
        used += (size_t)snprintf(out + used, size - used, "%s%s", lead, name);
    }
}

static bh_code no_setting(const bh_selection *view, const char *word, size_t length, bh_error *err)
{
    char settings[200] = "";
    const int given = length < 64 ? (int)length : 64;
    list_settings(bh_table_plan(view->table), settings, sizeof settings);
    return bh_fail(err, BH_EDOMAIN, "no setting \"%.*s\"; there are %s", given, word, settings);
}

static bh_code check_only(const bh_selection *view, const char *list, bh_error *err)
{
    const bh_plan *plan = bh_table_plan(view->table);
    while (list) {
        const char *word = NULL;
        const size_t length = piece(&list, &word);
        bool found = false;
        for (size_t i = 0; i < plan->setting_count && !found; i++)
            found = names(word, length, plan->settings[i].name);
        if (!found)
            return no_setting(view, word, length, err);
    }
    return BH_OK;
}

static bool wanted(const char *list, const char *setting)
{
    if (!list)
        return true;
    while (list) {
        const char *word = NULL;
        const size_t length = piece(&list, &word);
        if (names(word, length, setting))
            return true;
    }
    return false;
}

/* Equal keys keep the order of the plan: the row number decides. */
struct key {
    double number; /* NAN sorts last */
    const char *text;
    int sign; /* -1 turns the order of texts */
    size_t row;
};

static int by_key(const void *left, const void *right)
{
    const struct key *a = left, *b = right;
    int order = 0;
    if (a->text && b->text)
        order = a->sign * bh_sequence(a->text, b->text);
    else if (isnan(a->number) || isnan(b->number))
        order = isnan(a->number) - isnan(b->number);
    else
        order = (a->number > b->number) - (a->number < b->number);
    return order != 0 ? order : (a->row > b->row) - (a->row < b->row);
}

static bh_code sort_rows(bh_selection *view, const char *key, bh_error *err)
{
    const bool falling = key[0] == '-';
    key += falling;
    int id = -1;
    const bh_code bad = find_column(key, strlen(key), &id, err);
    if (bad || view->row_count < 2)
        return bad;
    struct key *keys = calloc(view->row_count, sizeof *keys);
    if (!keys)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    for (size_t i = 0; i < view->row_count; i++) {
        const double number = bh_selection_number(view, i, id);
        keys[i] = (struct key){falling ? -number : number, bh_selection_text(view, i, id),
                               falling ? -1 : 1, view->rows[i]};
    }
    qsort(keys, view->row_count, sizeof *keys, by_key);
    for (size_t i = 0; i < view->row_count; i++)
        view->rows[i] = keys[i].row;
    free(keys);
    return BH_OK;
}

static bh_code pick_rows(const char *only, bh_selection *view, bh_error *err)
{
    const size_t all = bh_table_rows(view->table, view->bins);
    view->rows = calloc(all ? all : 1, sizeof *view->rows);
    if (!view->rows)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    for (size_t row = 0; row < all; row++)
        if (wanted(only, bh_table_text(view->table, view->bins, row, BH_COL_SETTING)))
            view->rows[view->row_count++] = row;
    return BH_OK;
}

bh_code bh_selection_new(const bh_table *table, const bh_selection_request *request,
                         bh_selection *out, bh_error *err)
{
    *out = (bh_selection){.table = table, .bins = request->bins};
    bh_code bad = request->columns ? pick_columns(request->columns, out, err) : BH_OK;
    if (!bad && request->only)
        bad = check_only(out, request->only, err);
    if (!bad)
        bad = pick_rows(request->only, out, err);
    if (!bad && request->sort)
        bad = sort_rows(out, request->sort, err);
    return bad;
}

void bh_selection_free(bh_selection *view)
{
    free(view->rows);
    *view = (bh_selection){0};
}
