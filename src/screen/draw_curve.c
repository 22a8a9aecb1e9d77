/* draw_curve.c - cross section, rate or counts against angle, with what the arms accept. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/ticks.h"
#include "beamhours/screen/drawing_parts.h"
#include "beamhours/units/constants.h"

enum { MOST_WIDE = 240, MOST_HIGH = 64, LABEL = 9 };

/* Where what is drawn belongs on the terminal, and what its sides run over. */
struct plot {
    bh_canvas *canvas;
    int row, column, rows, columns;
    bh_axis x, y;
    unsigned char dots[MOST_HIGH][MOST_WIDE]; /* 2 x 4 dots a cell, as braille numbers them */
};

/* A logarithmic axis ends here, as a share of the largest value: nobody counts what is below. */
static const double smallest = 1e-12;

static const bh_column_id column_of[] = {BH_COL_POINT_CROSS_SECTION, BH_COL_SIGNAL, BH_COL_COUNTS};

static bool set_range(struct plot *p, const bh_curve *curve, bh_column_id column)
{
    double low = INFINITY, high = -INFINITY;
    p->x = (bh_axis){.from = INFINITY, .to = -INFINITY};
    for (size_t i = 0; i < bh_curve_count(curve); i++) {
        const double y = bh_curve_y(curve, i, column);
        if (!isfinite(y))
            continue;
        low = fmin(low, y);
        high = fmax(high, y);
        p->x.from = fmin(p->x.from, bh_curve_x(curve, i));
        p->x.to = fmax(p->x.to, bh_curve_x(curve, i));
    }
    if (!(p->x.to > p->x.from))
        return false;
    const bool logarithmic = low > 0 && high > 3 * low;
    p->y = bh_axis_around(logarithmic ? fmax(low, high * smallest) : low, high, logarithmic);
    return true;
}

static void dot(struct plot *p, int x, int y)
{
    static const unsigned char bits[4][2] = {{1, 8}, {2, 16}, {4, 32}, {64, 128}};
    if (x >= 0 && y >= 0 && x < 2 * p->columns && y < 4 * p->rows)
        p->dots[y / 4][x / 2] |= bits[y % 4][x % 2];
}

/* From one point to the next, so that steep parts have no gaps: of two columns each has the half
 * of the way up or down that is nearer to it. */
static void stroke(struct plot *p, const int from[2], const int to[2])
{
    const int steps = to[0] > from[0] ? to[0] - from[0] : 1;
    int before = from[1];
    for (int k = 1; k <= steps; k++) {
        const int y = (int)lrint(from[1] + (double)k / steps * (to[1] - from[1]));
        const int column = from[0] + (to[0] > from[0] ? k : 0), left = column - (to[0] > from[0]);
        const int towards = y > before ? 1 : -1;
        for (int at = before + towards; (y - at) * towards > 0; at += towards)
            dot(p, abs(at - before) < abs(y - at) ? left : column, at);
        dot(p, column, y);
        before = y;
    }
}

static void trace(struct plot *p, const bh_curve *curve, bh_column_id column)
{
    bool joins = false;
    int before[2] = {0, 0};
    for (size_t i = 0; i < bh_curve_count(curve); i++) {
        const double value = bh_curve_y(curve, i, column);
        if (!isfinite(value)) {
            joins = false;
            continue;
        }
        const double along = bh_axis_place(&p->x, bh_curve_x(curve, i));
        const int here[2] = {
            (int)lrint(along * (2 * p->columns - 1)),
            (int)lrint((1 - bh_axis_place(&p->y, value)) * (4 * p->rows - 1)),
        };
        stroke(p, joins ? before : here, here);
        memcpy(before, here, sizeof before);
        joins = true;
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

/* "2·10⁻³" becomes "2e⁻³" where a canvas makes plain digits of raised ones. */
static void spell(const char *label, bool ascii, char out[BH_TICK_LABEL])
{
    static const char times[] = "\u00b710";
    const char *power = strstr(label, times);
    if (ascii && power)
        (void)snprintf(out, BH_TICK_LABEL, "%.*se%s", (int)(power - label), label,
                       power + sizeof times - 1);
    else if (ascii && strncmp(label, "10", 2) == 0 && (unsigned char)label[2] >= 0x80)
        (void)snprintf(out, BH_TICK_LABEL, "1e%s", label + 2);
    else
        (void)snprintf(out, BH_TICK_LABEL, "%s", label);
}

/* [1] rows or columns that a label takes along its axis. */
static double one_row(void *asker, const char *text)
{
    (void)asker;
    (void)text;
    return 1;
}

static double its_columns(void *asker, const char *text)
{
    const bool *ascii = asker;
    char shown[BH_TICK_LABEL];
    spell(text, *ascii, shown);
    return bh_text_columns(shown, *ascii);
}

/* A line below the curve over some angles [rad]. */
static void underline(const struct plot *p, bh_interval angles, bh_look look, const char *with)
{
    const double last = p->columns - 1;
    const int first = (int)lrint(bh_axis_place(&p->x, angles.from / BH_DEGREE) * last);
    const int end = (int)lrint(bh_axis_place(&p->x, angles.to / BH_DEGREE) * last);
    for (int c = first < 0 ? 0 : first; c <= end && c < p->columns; c++)
        (void)bh_canvas_put(p->canvas, (bh_spot){p->row + p->rows, p->column + c, 1}, look, with);
}

/* The angles in the plane that a row's arm accepts, and those of its bin. */
static void show_acceptance(const struct plot *p, const bh_setting_arm *arm, int bin, bool here)
{
    bh_acceptance a;
    const bh_acceptance_spec spec = bh_arm_acceptance(arm);
    if (bh_acceptance_make(&spec, &a, NULL))
        return;
    underline(p, (bh_interval){fabs(a.whole.in_from), a.whole.in_to},
              here ? BH_LOOK_TITLE : BH_LOOK_QUIET, here ? "\u2594" : "-");
    if (bin > 0 && bin <= a.bins)
        underline(p,
                  (bh_interval){fabs(bh_acceptance_edge(&a, bin - 1)), bh_acceptance_edge(&a, bin)},
                  BH_LOOK_FOCUS, "\u2580");
}

/* Those of all rows; that of the row in focus stands out. */
static void show_acceptances(const bh_model *model, const struct plot *p)
{
    const bh_table_view *v = &model->table;
    for (size_t i = 0; i <= v->count; i++) { /* the one in focus last: over the others */
        const bool here = i == v->count;
        const bh_table_row *r = here ? bh_table_here(model) : &v->rows[i];
        if (r && (here || !r->bin))
            show_acceptance(p, &bh_table_setting(model, r)->arms[r->now->arm],
                            here ? r->now->bin : 0, here);
    }
}

static void show_rising(const struct plot *p)
{
    const bh_tick_room room = {.length = p->rows - 1, .apart = 0.2, .space = 1, .extent = one_row};
    bh_ticks ticks;
    char shown[BH_TICK_LABEL];
    bh_ticks_choose(&p->y, &room, &ticks);
    for (int r = 0; r < p->rows; r++)
        (void)bh_canvas_put(p->canvas, (bh_spot){p->row + r, p->column - 1, 1}, BH_LOOK_QUIET,
                            "\u2502");
    for (int i = 0; i < ticks.count; i++) {
        const double up = bh_axis_place(&p->y, ticks.tick[i].at);
        const int row = p->row + (int)lrint((1 - up) * (4 * p->rows - 1)) / 4;
        spell(ticks.tick[i].label, p->canvas->ascii, shown);
        (void)bh_canvas_put_right(p->canvas, (bh_spot){row, p->column - LABEL, LABEL - 1},
                                  BH_LOOK_QUIET, shown);
        (void)bh_canvas_put(p->canvas, (bh_spot){row, p->column - 1, 1}, BH_LOOK_QUIET, "\u2524");
    }
}

/* Angles below the acceptances, each at its place. */
static void show_angles(const struct plot *p)
{
    const bh_tick_room room = {.length = p->columns - 1,
                               .apart = 3,
                               .space = 6,
                               .extent = its_columns,
                               .asker = &p->canvas->ascii};
    const int row = p->row + p->rows + 1;
    bh_ticks ticks;
    char shown[BH_TICK_LABEL];
    bh_ticks_choose(&p->x, &room, &ticks);
    (void)bh_canvas_put_right(p->canvas, (bh_spot){row, p->column - LABEL, LABEL - 1},
                              BH_LOOK_QUIET, "deg");
    for (int i = 0; i < ticks.count; i++) {
        spell(ticks.tick[i].label, p->canvas->ascii, shown);
        const int wide = bh_text_columns(shown, p->canvas->ascii);
        const double along = bh_axis_place(&p->x, ticks.tick[i].at);
        int column = (int)lrint(along * (p->columns - 1)) - wide / 2;
        if (column > p->columns - wide)
            column = p->columns - wide;
        (void)bh_canvas_put(p->canvas, (bh_spot){row, p->column + (column < 0 ? 0 : column), wide},
                            BH_LOOK_QUIET, shown);
    }
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
    if (bh_table_setting(model, row)->arms[row->now->arm].first)
        return "none of a coincidence; each arm has one";
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
    (void)snprintf(name, sizeof name, " %s [%s] against angle%s%.40s ", what[shown],
                   bh_column_at((int)column)->unit, model->table.here[0] ? ", " : "",
                   model->table.here);
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
    show_rising(&p);
    show_angles(&p);
    show_acceptances(model, &p);
}
