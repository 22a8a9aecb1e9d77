/* figure_ratio.c - all of a figure divided by its first curve. */
#include "beamhours/report/figure_ratio.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static const double far = 1.0;           /* [1] times what the curves span: outside of the axis */
static const double logarithmic = 20.0;  /* [1] ratio of the largest to the smallest */
static const double least_span = 2.0e-3; /* [1] of the axis */

struct divider {
    const bh_figure_series *by; /* the first curve */
    bh_arena *arena;
    double lo, hi; /* [1] of the curves */
};

/* ln of the i-th point. */
static double height(const bh_figure_series *s, size_t i)
{
    return log(s->point[i].y);
}

/* The parabola through three points from `i` on, at x. */
static double parabola(const bh_figure_series *s, size_t i, double x)
{
    const double a = s->point[i].x, b = s->point[i + 1].x, c = s->point[i + 2].x;
    return height(s, i) * (x - b) * (x - c) / ((a - b) * (a - c)) +
           height(s, i + 1) * (x - a) * (x - c) / ((b - a) * (b - c)) +
           height(s, i + 2) * (x - a) * (x - b) / ((c - a) * (c - b));
}

/* The first curve at x, by the three points next to it; NAN beside it and in its gaps. */
static double divisor(const bh_figure_series *s, double x)
{
    size_t i = 0;
    if (s->count < 3 || !(x >= s->point[0].x && x <= s->point[s->count - 1].x))
        return (double)NAN;
    while (i + 3 < s->count && s->point[i + 2].x < x)
        i++;
    if (i > 0 && fabs(x - s->point[i].x) < fabs(s->point[i + 2].x - x) && x < s->point[i + 1].x)
        i--;
    return exp(parabola(s, i, x));
}

static void widen(struct divider *d, double value)
{
    if (!isfinite(value))
        return;
    d->lo = fmin(d->lo, value);
    d->hi = fmax(d->hi, value);
}

static bool divide_series(struct divider *d, const bh_figure_series *from, bh_figure_series *to)
{
    bh_figure_point *point = bh_arena_take(d->arena, from->count + 1, sizeof *point);
    for (size_t i = 0; point && i < from->count; i++) {
        const bh_figure_point *p = &from->point[i];
        const double by = divisor(d->by, p->x);
        point[i] = (bh_figure_point){p->x, p->y / by, p->inner / by, p->outer / by};
        if (from->kind == BH_SERIES_LINE)
            widen(d, point[i].y);
    }
    *to = *from;
    to->name = NULL; /* the legend has it above */
    to->point = point;
    return point != NULL;
}

static bool divide_band(const struct divider *d, const bh_figure_band *from, bh_figure_band *to)
{
    double *low = bh_arena_take(d->arena, from->count + 1, sizeof *low),
           *high = bh_arena_take(d->arena, from->count + 1, sizeof *high);
    for (size_t i = 0; low && high && i < from->count; i++) {
        const double by = divisor(d->by, from->x[i]);
        low[i] = from->low[i] / by;
        high[i] = from->high[i] / by;
    }
    *to = (bh_figure_band){NULL, from->count, from->x, low, high};
    return low && high;
}

/* Points and their bars count as far as they lie near the curves, which are to be told apart. */
static bh_axis axis_of(const bh_figure *below, struct divider *d)
{
    const double room = far * fmax(d->hi - d->lo, least_span);
    const double least = d->lo - room, most = d->hi + room;
    for (size_t s = 0; s < below->series_count; s++)
        for (size_t i = 0; below->series[s].kind != BH_SERIES_LINE && i < below->series[s].count;
             i++) {
            const bh_figure_point *p = &below->series[s].point[i];
            const double half = fmax(p->inner, p->outer);
            if (!(p->y >= least && p->y <= most))
                continue;
            widen(d, fmax(p->y - half, least));
            widen(d, fmin(p->y + half, most));
        }
    if (d->lo > 0.0 && d->hi > logarithmic * d->lo)
        return bh_axis_around(d->lo, d->hi, true);
    const double edge = fmax(0.08 * (d->hi - d->lo), least_span / 2.0);
    return (bh_axis){d->lo - edge, d->hi + edge, false};
}

static bool worth_it(const bh_figure *figure)
{
    size_t curves = 0;
    for (size_t s = 0; s < figure->series_count; s++)
        curves += figure->series[s].kind == BH_SERIES_LINE;
    if (curves < 2 || figure->series[0].kind != BH_SERIES_LINE)
        return false;
    size_t some = 0;
    for (size_t i = 0; i < figure->series[0].count; i++) {
        const double y = figure->series[0].point[i].y;
        if (y <= 0.0)
            return false;
        some += isfinite(y) ? 1 : 0;
    }
    return some > 2;
}

static const char *words_of(const bh_figure *figure, bh_arena *arena)
{
    const char *name = figure->series[0].name ? figure->series[0].name : "the first curve";
    const size_t size = strlen(name) + 16;
    char *text = bh_arena_take(arena, size, 1);
    if (text)
        (void)snprintf(text, size, "ratio to %.*s", (int)strcspn(name, ":"), name);
    return text ? text : "ratio";
}

bh_code bh_figure_add_ratio(bh_figure *figure, bh_arena *arena, bh_error *err)
{
    if (!worth_it(figure))
        return BH_OK;
    bh_figure *below = bh_arena_take(arena, 1, sizeof *below);
    bh_figure_series *series = bh_arena_take(arena, figure->series_count, sizeof *series);
    bh_figure_band *band = bh_arena_take(arena, figure->band_count + 1, sizeof *band);
    struct divider d = {&figure->series[0], arena, INFINITY, -INFINITY};
    bool fine = below && series && band;
    for (size_t s = 0; fine && s < figure->series_count; s++)
        fine = divide_series(&d, &figure->series[s], &series[s]);
    for (size_t b = 0; fine && b < figure->band_count; b++)
        fine = divide_band(&d, &figure->band[b], &band[b]);
    if (!fine)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    *below = *figure;
    below->title = words_of(figure, arena);
    below->series = series;
    below->band = band;
    below->y = (bh_figure_scale){"ratio", "", {0.0, 1.0, false}};
    below->y.axis = axis_of(below, &d);
    figure->below = below;
    return BH_OK;
}
