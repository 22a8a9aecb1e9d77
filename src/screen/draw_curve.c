/* draw_curve.c - cross section, rate or counts against angle, with what the arms accept. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/screen/model.h"
#include "beamhours/units/constants.h"

enum { MOST_WIDE = 240, MOST_HIGH = 64, LABEL = 9 };

/* Where what is drawn belongs on the terminal, and the values at its edges. */
struct plot {
    bh_canvas *canvas;
    int row, column, rows, columns;
    double x[2], y[2];
    bool logarithmic;
    unsigned char dots[MOST_HIGH][MOST_WIDE]; /* 2 x 4 dots a cell, as braille numbers them */
};

static const bh_column_id column_of[] = {BH_COL_POINT_CROSS_SECTION, BH_COL_SIGNAL, BH_COL_COUNTS};

static bool set_range(struct plot *p, const bh_curve *curve, bh_column_id column)
{
    p->y[0] = INFINITY;
    p->y[1] = -INFINITY;
    p->x[0] = INFINITY;
    p->x[1] = -INFINITY;
    for (size_t i = 0; i < bh_curve_count(curve); i++) {
        const double y = bh_curve_y(curve, i, column);
        if (!isfinite(y))
            continue;
        p->y[0] = fmin(p->y[0], y);
        p->y[1] = fmax(p->y[1], y);
        p->x[0] = fmin(p->x[0], bh_curve_x(curve, i));
        p->x[1] = fmax(p->x[1], bh_curve_x(curve, i));
    }
    p->logarithmic = p->y[0] > 0 && p->y[1] > 3 * p->y[0];
    return p->x[1] > p->x[0];
}

static double share(double value, const double edge[2], bool logarithmic)
{
    if (!(edge[1] > edge[0]))
        return 0.5;
    return logarithmic ? log(value / edge[0]) / log(edge[1] / edge[0])
                       : (value - edge[0]) / (edge[1] - edge[0]);
}

static void dot(struct plot *p, int x, int y)
{
    static const unsigned char bits[4][2] = {{1, 8}, {2, 16}, {4, 32}, {64, 128}};
    if (x >= 0 && y >= 0 && x < 2 * p->columns && y < 4 * p->rows)
        p->dots[y / 4][x / 2] |= bits[y % 4][x % 2];
}

static void trace(struct plot *p, const bh_curve *curve, bh_column_id column)
{
    double before = NAN;
    int last = 0;
    for (size_t i = 0; i < bh_curve_count(curve); i++) {
        const double value = bh_curve_y(curve, i, column);
        if (!isfinite(value)) {
            before = NAN;
            continue;
        }
        const int x = (int)lrint(share(bh_curve_x(curve, i), p->x, false) * (2 * p->columns - 1));
        const double y = (1 - share(value, p->y, p->logarithmic)) * (4 * p->rows - 1);
        for (int k = isnan(before) ? x : last; k <= x; k++) {
            const double part = x > last && !isnan(before) ? (double)(k - last) / (x - last) : 1;
            dot(p, k, (int)lrint(isnan(before) ? y : before + part * (y - before)));
        }
        before = y;
        last = x;
    }
}

static uint32_t dots_as(unsigned char dots, bool ascii)
{
    const bool high = dots & (1 | 8 | 2 | 16), low = dots & (4 | 32 | 64 | 128);
    if (!ascii)
        return 0x2800U + dots;
    return high && low ? '|' : high ? '\'' : '.';
}

static void show_dots(const struct plot *p)
{
    for (int r = 0; r < p->rows; r++)
        for (int c = 0; c < p->columns; c++) {
            bh_cell *cell = bh_canvas_at(p->canvas, p->row + r, p->column + c);
            if (cell && p->dots[r][c])
                cell->point = dots_as(p->dots[r][c], p->canvas->ascii);
        }
}

static void label(const struct plot *p, int row, double value)
{
    char number[BH_NUMBER_SIZE];
    if (!isfinite(value))
        return;
    if (value > 0 && (value < 0.01 || value >= 1e5))
        (void)snprintf(number, sizeof number, "%.1e", value);
    else
        (void)bh_number_digits(value, 3, number, sizeof number);
    (void)bh_canvas_put_right(p->canvas, (bh_spot){row, p->column - LABEL, LABEL - 1},
                              BH_LOOK_QUIET, number);
}

/* The in-plane acceptance of one row. */
static void show_acceptance(const struct plot *p, const bh_setting_arm *arm, bool here)
{
    const bool ring = arm->arm.shape == BH_SHAPE_RING;
    const double middle = ring ? 0 : arm->angle.value;
    const bh_extent *wide = ring ? &arm->arm.ring : &arm->arm.in_plane;
    const double from = (middle + wide->from) * 180 / BH_PI, to = (middle + wide->to) * 180 / BH_PI;
    const int first = (int)lrint(share(from, p->x, false) * (p->columns - 1));
    const int last = (int)lrint(share(to, p->x, false) * (p->columns - 1));
    for (int c = first < 0 ? 0 : first; c <= last && c < p->columns; c++)
        (void)bh_canvas_put(p->canvas, (bh_spot){p->row + p->rows, p->column + c, 1},
                            here ? BH_LOOK_TITLE : BH_LOOK_QUIET, here ? "\u2594" : "-");
}

/* Those of all rows, below the curve; that of the row in focus stands out. */
static void show_acceptances(const bh_model *model, const struct plot *p)
{
    const bh_table_view *v = &model->table;
    for (size_t i = 0; i <= v->count; i++) { /* the one in focus last: over the others */
        const size_t k = i < v->count ? i : v->at;
        const bh_table_row *r = k < v->count ? &v->rows[k] : NULL;
        if (r && !r->bin)
            show_acceptance(p, &bh_table_setting(model, r)->arms[r->now->arm], k == v->at);
    }
}

static void show_axes(const struct plot *p)
{
    char text[80];
    label(p, p->row, p->y[1]);
    label(p, p->row + p->rows - 1, p->y[0]);
    for (int r = 0; r < p->rows; r++)
        (void)bh_canvas_put(p->canvas, (bh_spot){p->row + r, p->column - 1, 1}, BH_LOOK_QUIET,
                            "\u2502");
    (void)snprintf(text, sizeof text, "%.4g deg", p->x[0]);
    const int row = p->row + p->rows + 1;
    (void)bh_canvas_put(p->canvas, (bh_spot){row, p->column, 20}, BH_LOOK_QUIET, text);
    (void)snprintf(text, sizeof text, "%.4g deg", p->x[1]);
    (void)bh_canvas_put_right(p->canvas, (bh_spot){row, p->column, p->columns}, BH_LOOK_QUIET,
                              text);
}

static void draw_title(const bh_arrangement *places, const char *name, bh_canvas *canvas)
{
    const bh_spot spot = {places->curve, places->table_column, places->table_columns};
    for (int c = 0; c < spot.width; c++)
        (void)bh_canvas_put(canvas, (bh_spot){spot.row, spot.column + c, 1}, BH_LOOK_QUIET,
                            "\u2500");
    (void)bh_canvas_put(canvas, (bh_spot){spot.row, spot.column + 2, spot.width - 2}, BH_LOOK_TITLE,
                        name);
}

/* Why there is no curve. */
static const char *excuse(const bh_model *model)
{
    const bh_table_row *row = bh_table_here(model);
    if (!row)
        return "";
    if (bh_table_setting(model, row)->arms[row->now->arm].arm.shape == BH_SHAPE_RING)
        return "a ring has no angle to vary";
    if (!model->curve)
        return "being computed \u2026";
    return model->curve->why.text[0] ? model->curve->why.text : "no values";
}

void bh_draw_curve(const bh_model *model, const bh_arrangement *places, bh_canvas *canvas)
{
    static const char *const what[] = {"cross section", "signal rate", "counts"};
    const int shown = (int)model->curve_shown % (int)BH_SHOW_NO_CURVE;
    const bh_curve *curve = model->curve ? model->curve->curve : NULL;
    const bh_column_id column = column_of[shown];
    struct plot p = {.canvas = canvas,
                     .row = places->curve + 1,
                     .column = places->table_column + LABEL,
                     .rows = places->curve_rows - 3,
                     .columns = places->table_columns - LABEL};
    char name[120];
    (void)snprintf(name, sizeof name, " %s [%s] against angle, %.40s ", what[shown],
                   bh_column_at((int)column)->unit, model->table.here);
    draw_title(places, name, canvas);
    if (p.rows < 2 || p.columns < 10)
        return;
    p.rows = p.rows > MOST_HIGH ? MOST_HIGH : p.rows;
    p.columns = p.columns > MOST_WIDE ? MOST_WIDE : p.columns;
    if (!curve || !set_range(&p, curve, column)) {
        (void)bh_canvas_put(canvas, (bh_spot){p.row, p.column, p.columns}, BH_LOOK_QUIET,
                            excuse(model));
        return;
    }
    trace(&p, curve, column);
    show_dots(&p);
    show_axes(&p);
    show_acceptances(model, &p);
}
