/* tableview.c - which rows and cells of the run table are shown, and against what. */
#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sequence.h"
#include "beamhours/screen/model.h"

void bh_table_free_view(bh_table_view *view)
{
    for (size_t i = 0; i < view->opened_count; i++)
        free(view->opened[i]);
    free(view->opened);
    free(view->rows);
    *view = (bh_table_view){.order = -1};
}

/* The outcome whose rows are shown: the newest that has some. */
static const bh_outcome *shown(const bh_model *model)
{
    return model->now && model->now->of->plan && !model->now->failed[0] ? model->now : model->kept;
}

const bh_setting *bh_table_setting(const bh_model *model, const bh_table_row *row)
{
    return &shown(model)->of->plan->settings[row->now->setting];
}

/* --- rows of another outcome --- */

static bool same_setting(const bh_outcome *a, size_t s, const bh_outcome *b, size_t t)
{
    return t < b->setting_count && b->known[t] &&
           a->of->plan->settings[s].arm_count == b->of->plan->settings[t].arm_count &&
           strcmp(a->of->plan->settings[s].name, b->of->plan->settings[t].name) == 0;
}

/* The setting of `other` with the name of setting `s`; its count where there is none. */
static size_t match(const bh_outcome *of, size_t s, const bh_outcome *other, size_t *hint)
{
    if (same_setting(of, s, other, *hint))
        return (*hint)++;
    for (size_t t = 0; t < other->setting_count; t++)
        if (same_setting(of, s, other, t)) {
            *hint = t + 1;
            return t;
        }
    return other->setting_count;
}

static const bh_row *row_in(const bh_outcome *other, size_t setting, size_t arm)
{
    return setting < other->setting_count ? &other->rows[other->first_row[setting] + arm] : NULL;
}

/* --- building --- */

struct building {
    bh_model *model;
    bh_table_view *view;
    const bh_outcome *of, *against;
    size_t hints[2];
    bool failed;
};

static void push(struct building *b, bh_table_row row)
{
    bh_table_view *v = b->view;
    if (v->count == v->room) {
        const size_t room = v->room ? 2 * v->room : 64;
        bh_table_row *more = realloc(v->rows, room * sizeof *more);
        if (!more) {
            b->failed = true;
            return;
        }
        v->rows = more;
        v->room = room;
    }
    v->rows[v->count++] = row;
}

static bool is_open(const bh_table_view *v, const char *name)
{
    for (size_t i = 0; i < v->opened_count; i++)
        if (strcmp(v->opened[i], name) == 0)
            return true;
    return false;
}

static void push_setting(struct building *b, size_t s)
{
    const bh_outcome *o = b->of, *kept = b->model->kept;
    const bool old = !o->known[s] && kept && kept->of->plan;
    const size_t t = old ? match(o, s, kept, &b->hints[0]) : 0;
    const size_t u = b->against ? match(o, s, b->against, &b->hints[1]) : 0;
    for (size_t a = 0; a < o->of->plan->settings[s].arm_count; a++) {
        const size_t r = o->first_row[s] + a;
        const bh_row *was = old ? row_in(kept, t, a) : NULL;
        push(b, (bh_table_row){.row = r,
                               .stale = !o->known[s],
                               .now = o->known[s] || !was ? &o->rows[r] : was,
                               .before = b->against ? row_in(b->against, u, a) : NULL});
    }
}

/* Puts the rows of bins behind the rows that are open. */
static void push_bins(struct building *b, const bh_table_row *whole)
{
    const bh_outcome *o = b->of;
    const size_t s = o->rows[whole->row].setting, arm = o->rows[whole->row].arm;
    if (!o->bins || !o->bins_known[s] || !is_open(b->view, o->of->plan->settings[s].name))
        return;
    for (size_t i = o->first_bin[s]; i < o->first_bin[s + 1]; i++)
        if (o->bins[i].arm == arm)
            push(b, (bh_table_row){.row = i, .bin = true, .now = &o->bins[i]});
}

/* --- order --- */

struct ordered {
    bh_table_row row;
    double key;
    const char *text;
    bool falling;
    size_t place;
};

static int by_key(const void *x, const void *y)
{
    const struct ordered *a = x, *b = y;
    int order = 0;
    if (a->text && b->text)
        order = bh_sequence(a->text, b->text);
    else if (isnan(a->key) != isnan(b->key))
        return isnan(a->key) ? 1 : -1; /* empty cells last */
    else
        order = (a->key > b->key) - (a->key < b->key);
    if (order == 0)
        return (a->place > b->place) - (a->place < b->place);
    return a->falling ? -order : order;
}

static const char *text_of(const bh_plan *plan, const bh_row *row, int column)
{
    const bh_setting *s = &plan->settings[row->setting];
    switch (column) {
    case BH_COL_SETTING:
        return s->name;
    case BH_COL_ARM:
        return s->arms[row->arm].arm.name.text;
    case BH_COL_PARTICLE:
        return s->beam.particle.name;
    case BH_COL_TARGET:
        return s->target->name.text;
    case BH_COL_SCATTERER:
        return s->target->scatterer.text;
    default:
        return NULL;
    }
}

static void put_in_order(struct building *b)
{
    bh_table_view *v = b->view;
    const size_t count = v->count;
    struct ordered *list = count ? malloc(count * sizeof *list) : NULL;
    if (!list)
        return;
    for (size_t i = 0; i < count; i++) {
        const bh_table_row *r = &v->rows[i];
        const char *text = v->order < 0 ? NULL : text_of(b->of->of->plan, r->now, v->order);
        const bool number = v->order >= 0 && !text;
        list[i] = (struct ordered){.row = *r,
                                   .key = number ? r->now->number[v->order] : 0,
                                   .text = text,
                                   .falling = v->falling,
                                   .place = i};
    }
    if (v->order >= 0)
        qsort(list, count, sizeof *list, by_key);
    v->count = 0;
    for (size_t i = 0; i < count; i++) {
        push(b, list[i].row);
        push_bins(b, &list[i].row);
    }
    free(list);
}

/* --- the row in focus stays in focus --- */

static void remember(bh_model *model)
{
    bh_table_view *v = &model->table;
    const bh_table_row *row = bh_table_here(model);
    if (!row)
        return;
    strncpy(v->here, bh_table_setting(model, row)->name, sizeof v->here - 1);
    v->here_arm = row->now->arm;
    v->here_bin = row->bin ? row->now->bin : 0;
}

static void find_again(bh_model *model)
{
    bh_table_view *v = &model->table;
    for (size_t i = 0; i < v->count; i++) {
        const bh_table_row *r = &v->rows[i];
        if ((r->bin ? r->now->bin : 0) == v->here_bin && r->now->arm == v->here_arm &&
            strcmp(bh_table_setting(model, r)->name, v->here) == 0) {
            v->at = i;
            return;
        }
    }
    if (v->at >= v->count)
        v->at = v->count ? v->count - 1 : 0;
}

/* --- changes --- */

static double relative(const bh_table_row *row, int column)
{
    if (!row->before || row->before->why[column] == BH_WHY_NOT_ASKED)
        return 0;
    const double a = row->before->number[column], b = row->now->number[column];
    if (isnan(a) || isnan(b))
        return isnan(a) != isnan(b) ? 1 : 0;
    return fabs(a) > 0 ? fabs(b / a - 1) : fabs(b) > 0 ? 1 : 0;
}

/* The column of which the old value is shown: the one in focus, or hours. */
static int compared(const bh_table_view *v)
{
    const int column = v->column < v->column_count ? v->columns[v->column].column : BH_COL_HOURS;
    return bh_column_at(column)->kind == BH_CELL_NUMBER ? column : BH_COL_HOURS;
}

static void measure_changes(bh_model *model)
{
    bh_table_view *v = &model->table;
    const int column = v->compared = compared(v);
    v->most_change = 0;
    for (size_t i = 0; i < v->count; i++) {
        v->rows[i].change = v->rows[i].stale ? 0 : relative(&v->rows[i], column);
        v->most_change = fmax(v->most_change, v->rows[i].change);
    }
}

static const bh_outcome *compared_with(const bh_model *model)
{
    const bh_outcome *o = model->pin ? model->pin : model->trying ? model->kept : NULL;
    return o && o->of->plan ? o : NULL;
}

void bh_table_refresh(bh_model *model)
{
    struct building b = {
        .model = model, .view = &model->table, .of = shown(model), .against = compared_with(model)};
    model->table.count = 0;
    if (!b.of || !b.of->of->plan)
        return;
    for (size_t s = 0; s < b.of->setting_count; s++)
        push_setting(&b, s);
    put_in_order(&b);
    find_again(model);
    remember(model);
    bh_table_columns(model);
    measure_changes(model);
    bh_table_keep_in_view(model);
}

/* --- what is asked of the worker --- */

size_t bh_model_in_view(const bh_model *model, size_t *settings, size_t room)
{
    const bh_table_view *v = &model->table;
    const size_t rows = (size_t)bh_arrange(model).table_rows;
    size_t n = 0;
    for (size_t i = v->top; i < v->count && i < v->top + rows && n < room; i++)
        if (n == 0 || settings[n - 1] != v->rows[i].now->setting)
            settings[n++] = v->rows[i].now->setting;
    for (size_t i = 0; v->count == 0 && i < rows && n < room; i++)
        settings[n++] = i; /* nothing known yet: the first ones */
    return n;
}

size_t bh_model_opened(const bh_model *model, size_t *settings, size_t room)
{
    const bh_outcome *o = shown(model);
    size_t n = 0;
    for (size_t s = 0; o && o->of->plan && s < o->setting_count && n < room; s++)
        if (is_open(&model->table, o->of->plan->settings[s].name))
            settings[n++] = s;
    return n;
}

/* --- keys --- */

const bh_table_row *bh_table_here(const bh_model *model)
{
    const bh_table_view *v = &model->table;
    return v->at < v->count ? &v->rows[v->at] : NULL;
}

void bh_table_keep_in_view(bh_model *model)
{
    bh_table_view *v = &model->table;
    const int room = bh_arrange(model).table_rows;
    const size_t rows = room > 1 ? (size_t)room : 1;
    if (v->at < v->top)
        v->top = v->at;
    if (v->at >= v->top + rows)
        v->top = v->at - rows + 1;
    if (v->top + rows > v->count)
        v->top = v->count > rows ? v->count - rows : 0;
}

void bh_table_go(bh_model *model, long by)
{
    bh_table_view *v = &model->table;
    const long last = v->count ? (long)v->count - 1 : 0;
    long at = (long)v->at + by;
    at = at < 0 ? 0 : at > last ? last : at;
    v->at = (size_t)at;
    remember(model);
    bh_table_keep_in_view(model);
    model->curve_due = true;
}

void bh_table_order(bh_model *model)
{
    bh_table_view *v = &model->table;
    const int column = v->column < v->column_count ? v->columns[v->column].column : -1;
    if (column < 0)
        return;
    if (v->order != column) {
        v->order = column;
        v->falling = false;
    } else if (!v->falling) {
        v->falling = true;
    } else {
        v->order = -1;
    }
    bh_table_refresh(model);
    const char *heading = bh_column_at(column)->heading;
    if (v->order < 0)
        bh_model_note(model, false, "rows in the order of the plan");
    else
        bh_model_note(model, false, "rows by %s, %s", heading, v->falling ? "falling" : "rising");
}

void bh_table_pin(bh_model *model)
{
    if (model->pin) {
        bh_outcome_leave(model->pin);
        model->pin = NULL;
        bh_model_note(model, false, "the pin is off");
    } else if (model->kept) {
        model->pin = bh_outcome_share(model->kept);
        bh_model_note(model, false, "pinned: every later change is shown against this table");
    }
    bh_table_refresh(model);
}

static void forget_open(bh_table_view *v, const char *name)
{
    for (size_t i = 0; i < v->opened_count; i++)
        if (strcmp(v->opened[i], name) == 0) {
            free(v->opened[i]);
            v->opened[i] = v->opened[--v->opened_count];
            return;
        }
}

void bh_table_open_bins(bh_model *model)
{
    bh_table_view *v = &model->table;
    const bh_table_row *row = bh_table_here(model);
    if (!row)
        return;
    const char *name = bh_table_setting(model, row)->name;
    v->here_bin = 0;
    if (is_open(v, name)) {
        forget_open(v, name);
        bh_table_refresh(model);
        return;
    }
    char **more = realloc(v->opened, (v->opened_count + 1) * sizeof *more);
    char *own = strdup(name);
    if (more)
        v->opened = more;
    if (more && own)
        v->opened[v->opened_count++] = own;
    else
        free(own);
    model->job_due = true;
    bh_table_refresh(model);
}
