/* tablecells.c - columns of the run table as people read them: one prefix a column, few digits. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/screen/model.h"

struct prefix {
    double scale; /* of the unit in the column's key */
    const char *unit;
};

/* By falling size; the first in which the largest value is at least 1 is taken. */
static const struct prefix cross_sections[] = {{1e-6, "b/sr"}, {1e-3, "mb/sr"}, {1, "ub/sr"},
                                               {1e3, "nb/sr"}, {1e6, "pb/sr"},  {1e9, "fb/sr"}};
static const struct prefix shares[] = {{100, "%"}};

static const struct {
    int column;
    const struct prefix *prefixes;
    size_t count;
} families[] = {{BH_COL_POINT_CROSS_SECTION, cross_sections, 6},
                {BH_COL_CROSS_SECTION, cross_sections, 6},
                {BH_COL_STATISTICAL, shares, 1},
                {BH_COL_SYSTEMATIC, shares, 1},
                {BH_COL_PER_MRAD, shares, 1},
                {BH_COL_PER_PERMILLE, shares, 1}};

/* What people look at first; the others follow in the order of the list of columns. */
static const int first_ones[] = {
    BH_COL_SETTING,       BH_COL_ARM,           BH_COL_ANGLE,       BH_COL_Q2,
    BH_COL_CROSS_SECTION, BH_COL_SIGNAL,        BH_COL_HOURS,       BH_COL_STATISTICAL,
    BH_COL_SYSTEMATIC,    BH_COL_BACKGROUND,    BH_COL_LIVE,        BH_COL_COUNTS,
    BH_COL_BEAM_KINETIC,  BH_COL_HOURS_TO_GOAL, BH_COL_EMPTY_HOURS, BH_COL_CHARGE,
    BH_COL_EPSILON,       BH_COL_RADIATIVE,     BH_COL_KEPT};

enum { FIRST_ONES = (int)(sizeof first_ones / sizeof first_ones[0]) };

static double largest(const bh_table_view *v, int column)
{
    double most = 0;
    for (size_t i = 0; i < v->count; i++) {
        const bh_row *rows[] = {v->rows[i].bin ? NULL : v->rows[i].now, v->rows[i].before};
        for (int k = 0; k < 2; k++)
            if (rows[k] && isfinite(rows[k]->number[column]))
                most = fmax(most, fabs(rows[k]->number[column]));
    }
    return most;
}

static bh_table_column scaled(const bh_table_view *v, int column)
{
    const bh_column *row = bh_column_at(column);
    bh_table_column c = {.column = column, .scale = 1, .unit = row->unit, .digits = row->digits};
    for (size_t f = 0; f < sizeof families / sizeof families[0]; f++) {
        if (families[f].column != column)
            continue;
        const double most = families[f].count > 1 ? largest(v, column) : 1;
        size_t p = 0;
        while (p + 1 < families[f].count && most > 0 && most * families[f].prefixes[p].scale < 1)
            p++;
        c.scale = families[f].prefixes[p].scale;
        c.unit = families[f].prefixes[p].unit;
    }
    return c;
}

/* Several arms in some setting, or settings with different arms. */
static bool arms_vary(const bh_model *model)
{
    const bh_table_view *v = &model->table;
    const char *first = NULL;
    for (size_t i = 0; i < v->count; i++) {
        const bh_setting *s = bh_table_setting(model, &v->rows[i]);
        const char *name = s->arms[v->rows[i].now->arm].arm.name.text;
        if (first && name && strcmp(first, name) != 0)
            return true;
        first = first ? first : name;
    }
    return false;
}

static bool listed(const bh_table_view *v, int column)
{
    for (int i = 0; i < v->column_count; i++)
        if (v->columns[i].column == column)
            return true;
    return false;
}

static void add_column(bh_table_view *v, int column)
{
    if (v->column_count < BH_MOST_SHOWN - 1 && !listed(v, column))
        v->columns[v->column_count++] = scaled(v, column);
}

/* What a name may take of the table. */
static int longest_word(const bh_model *model)
{
    const int most = bh_arrange(model).table_columns * 2 / 5;
    return most < 8 ? 8 : most > 40 ? 40 : most;
}

/* A longer one keeps its two ends, since names of one plan often begin alike. */
static void shorten(const char *word, int most, char out[BH_CELL_ROOM])
{
    const int length = (int)strlen(word), head = (most - 1) / 2;
    if (length <= most)
        (void)snprintf(out, BH_CELL_ROOM, "%s", word);
    else
        (void)snprintf(out, BH_CELL_ROOM, "%.*s\u2026%s", head, word,
                       word + length - (most - 1 - head));
}

/* Of a coincidence each of its two arms. */
static void write_word(const bh_model *model, const bh_table_row *row, const char *word,
                       char out[BH_CELL_ROOM])
{
    const bh_setting_arm *arm = &bh_table_setting(model, row)->arms[row->now->arm];
    const int most = longest_word(model);
    char a[BH_CELL_ROOM], b[BH_CELL_ROOM];
    if (word != arm->arm.name.text || !arm->first || (int)strlen(word) <= most) {
        shorten(word, most, out);
        return;
    }
    shorten(arm->first->arm.name.text, (most - 1) / 2, a);
    shorten(arm->second->arm.name.text, (most - 1) / 2, b);
    (void)snprintf(out, BH_CELL_ROOM, "%.31s+%.31s", a, b);
}

static int widest(int a, int b)
{
    return a > b ? a : b;
}

static void widen(const bh_model *model, size_t row, const bh_table_column *c, int *width)
{
    char cell[BH_CELL_ROOM];
    bh_table_cell(model, &model->table.rows[row], c, false, cell);
    *width = widest(*width, bh_text_columns(cell, model->ascii));
}

/* The longest cells of a column are its smallest and its largest: few need to be written out. */
static void measure_ends(const bh_model *model, const bh_table_column *c, int *width)
{
    const bh_table_view *v = &model->table;
    size_t small = v->count, large = v->count, least = v->count;
    for (size_t i = 0; i < v->count; i++) {
        const double x = v->rows[i].now->number[c->column];
        if (!isfinite(x) || !(fabs(x) > 0))
            continue;
        if (small == v->count || fabs(x) < fabs(v->rows[small].now->number[c->column]))
            small = i;
        if (large == v->count || fabs(x) > fabs(v->rows[large].now->number[c->column]))
            large = i;
        if (least == v->count || x < v->rows[least].now->number[c->column])
            least = i;
    }
    if (small == v->count)
        return;
    widen(model, small, c, width);
    widen(model, large, c, width);
    widen(model, least, c, width);
}

/* Columns are as wide as what the table has had since the plan was opened: they do not jump about
 * when other rows come into view. */
static void set_widths(bh_model *model)
{
    bh_table_view *v = &model->table;
    const size_t rows = (size_t)bh_arrange(model).table_rows;
    for (int i = 0; i < v->column_count; i++) {
        bh_table_column *c = &v->columns[i];
        const bh_column *row = bh_column_at(c->column);
        int *width = &v->widths[c->column];
        const int heads = widest((int)strlen(row->heading), (int)strlen(c->unit));
        *width = widest(*width, heads);
        measure_ends(model, c, width);
        for (size_t r = v->top; r < v->count && r < v->top + rows; r++)
            widen(model, r, c, width);
        if (row->kind != BH_CELL_NUMBER && *width > longest_word(model))
            *width = longest_word(model);
        const bool ordered = v->order == c->column; /* by a mark before its heading */
        c->width = widest(*width, (int)strlen(row->heading) + ordered);
    }
}

static bool is_of_changes(int column)
{
    return column == BH_COL_PER_MRAD || column == BH_COL_PER_PERMILLE;
}

/* They are computed as soon as they are in view, or the rows are in their order. */
static void mind_changes(bh_model *model)
{
    const bh_table_view *v = &model->table;
    const bh_arrangement places = bh_arrange(model);
    bool seen = is_of_changes(v->order);
    bh_column_places p;
    if (model->changes)
        return;
    bh_place_columns(model, &places, &p);
    for (int i = 0; i < p.count && !seen; i++)
        seen = p.index[i] >= 0 && is_of_changes(v->columns[p.index[i]].column);
    model->changes = seen;
    model->job_due = model->job_due || seen;
}

void bh_table_columns(bh_model *model)
{
    bh_table_view *v = &model->table;
    v->column_count = 0;
    const bool arms = arms_vary(model);
    for (int i = 0; i < FIRST_ONES; i++)
        if (first_ones[i] != BH_COL_ARM || arms)
            add_column(v, first_ones[i]);
    for (int c = 0; c < BH_COLUMN_COUNT; c++)
        if (c != BH_COL_BIN)
            add_column(v, c);
    if (v->column >= v->column_count)
        v->column = 0;
    set_widths(model);
    mind_changes(model);
}

static const char *word_of(const bh_model *model, const bh_table_row *row, int column)
{
    const bh_setting *s = bh_table_setting(model, row);
    switch (column) {
    case BH_COL_SETTING:
        return s->name;
    case BH_COL_ARM:
        return s->arms[row->now->arm].arm.name.text;
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

void bh_table_cell(const bh_model *model, const bh_table_row *row, const bh_table_column *column,
                   bool before, char out[BH_CELL_ROOM])
{
    const bh_row *of = before ? row->before : row->now;
    out[0] = '\0';
    if (!of)
        return;
    if (column->column == BH_COL_SETTING && row->bin) {
        (void)snprintf(out, BH_CELL_ROOM, " bin %d", of->bin);
        return;
    }
    const char *word = word_of(model, row, column->column);
    const double value = of->number[column->column];
    const bool known = row->bin || !row->stale || of->number[BH_COL_ANGLE] > 0 ||
                       of->number[BH_COL_SOLID_ANGLE] > 0;
    if (word)
        write_word(model, row, word, out);
    else if (!known || of->why[column->column] == BH_WHY_NOT_ASKED)
        (void)snprintf(out, BH_CELL_ROOM, "\u2026");
    else if (!isfinite(value))
        (void)snprintf(out, BH_CELL_ROOM, "-");
    else if (!(fabs(value) > 0))
        (void)snprintf(out, BH_CELL_ROOM, "0");
    else
        (void)bh_number_digits(value * column->scale, column->digits, out, BH_CELL_ROOM);
}

bool bh_table_changed(const bh_model *model, const bh_table_row *row, const bh_table_column *column)
{
    char now[BH_CELL_ROOM], before[BH_CELL_ROOM];
    const int c = column->column;
    if (row->stale || !row->before || row->before->why[c] == BH_WHY_NOT_ASKED ||
        fabs(row->now->number[c] - row->before->number[c]) <= 0)
        return false;
    bh_table_cell(model, row, column, false, now);
    bh_table_cell(model, row, column, true, before);
    return strcmp(now, before) != 0;
}

/* --- keys --- */

static void sideways(bh_model *model, int by)
{
    bh_table_view *v = &model->table;
    const int at = v->column + by;
    if (at >= 0 && at < v->column_count)
        v->column = at;
    bh_table_refresh(model);
}

static void mouse(bh_model *model, const bh_press *press)
{
    bh_table_view *v = &model->table;
    const bh_arrangement places = bh_arrange(model);
    if (press->kind == BH_PRESS_WHEEL_UP || press->kind == BH_PRESS_WHEEL_DOWN) {
        bh_table_go(model, press->kind == BH_PRESS_WHEEL_UP ? -3 : 3);
        return;
    }
    const int column = bh_table_column_at(model, press->column);
    if (column >= 0)
        v->column = column;
    const long row = press->row - places.body - 3;
    if (row < 0) {
        if (row >= -2 && column >= 0)
            bh_table_order(model); /* a click on its head */
        return;
    }
    if (row < places.table_rows && v->top + (size_t)row < v->count) {
        bh_table_go(model, (long)v->top + row - (long)v->at);
        if (press->kind == BH_PRESS_DOUBLE_CLICK)
            bh_table_open_bins(model);
    }
    bh_table_refresh(model);
}

bool bh_table_press(bh_model *model, const bh_press *press)
{
    const long page = bh_arrange(model).table_rows > 1 ? bh_arrange(model).table_rows - 1 : 1;
    switch (press->kind) {
    case BH_PRESS_UP:
        bh_table_go(model, -1);
        return true;
    case BH_PRESS_DOWN:
        bh_table_go(model, 1);
        return true;
    case BH_PRESS_PAGE_UP:
        bh_table_go(model, -page);
        return true;
    case BH_PRESS_PAGE_DOWN:
        bh_table_go(model, page);
        return true;
    case BH_PRESS_HOME:
        bh_table_go(model, -(long)model->table.count);
        return true;
    case BH_PRESS_END:
        bh_table_go(model, (long)model->table.count);
        return true;
    case BH_PRESS_LEFT:
        sideways(model, -1);
        return true;
    case BH_PRESS_RIGHT:
        sideways(model, 1);
        return true;
    case BH_PRESS_ENTER:
        bh_table_open_bins(model);
        return true;
    case BH_PRESS_CLICK:
    case BH_PRESS_DOUBLE_CLICK:
    case BH_PRESS_WHEEL_UP:
    case BH_PRESS_WHEEL_DOWN:
        mouse(model, press);
        return true;
    default:
        return false;
    }
}
