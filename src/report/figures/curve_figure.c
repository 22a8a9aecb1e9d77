/* curve_figure.c - gathers points in the units of the keys, looks how far they reach, chooses axes
 * and units, and only then scales. */
#include "beamhours/report/curve_figure.h"

#include <math.h>
#include <string.h>

#include "beamhours/report/curve_words.h"
#include "beamhours/report/figure_ratio.h"
#include "beamhours/report/stands.h"

static const double logarithmic_from = 20.0, /* ratio of the largest to the smallest */
    most_decades = 1e14;                     /* likewise: what is smaller is not shown */

enum { MOST_SERIES = BH_MOST_CURVES + 1 + BH_MOST_SOURCES };

/* How far numbers reach. */
struct reach {
    double lo, hi;
    double least; /* above 0 */
};

struct maker {
    const bh_curve_picture *p;
    bh_arena *arena;
    bh_figure *out;
    bh_error *err;
    struct reach x, y;
    bh_figure_series series[MOST_SERIES];
    bh_figure_point *points[MOST_SERIES]; /* of each */
    double *band;                         /* x, low, high, one behind the other */
    bh_figure_point *planned;
    size_t planned_count;
    bh_figure_span *spans;
    double **edges;     /* of each */
    const char *reason; /* why a planned row is empty */
    bool systematic;    /* some planned point has it */
};

static bh_code no_memory(const struct maker *m)
{
    return bh_fail(m->err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

static void widen(struct reach *r, double value)
{
    if (!isfinite(value))
        return;
    r->lo = fmin(r->lo, value);
    r->hi = fmax(r->hi, value);
    if (value > 0.0)
        r->least = fmin(r->least, value);
}

static void add_series(struct maker *m, const bh_figure_series *series, bh_figure_point *point)
{
    const size_t n = m->out->series_count++;
    m->series[n] = *series;
    m->series[n].point = m->points[n] = point;
}

/* --- curves --- */

/* The first curve is whole; others, which are laid over it, end where their model is no longer
 * known. */
static double height_of(const struct maker *m, size_t k, size_t i)
{
    const bh_curve *c = m->p->curves->curve[k];
    return k > 0 && !bh_curve_inside(c, i) ? (double)NAN : bh_shown_on_curve(c, i, m->p->shown);
}

static bh_code take_curves(struct maker *m)
{
    const bh_curves *c = m->p->curves;
    for (size_t k = 0; k < c->count; k++) {
        const size_t n = bh_curve_count(c->curve[k]);
        bool some = false;
        bh_figure_point *point = bh_arena_take(m->arena, n + 1, sizeof *point);
        if (!point)
            return no_memory(m);
        for (size_t i = 0; i < n; i++) {
            point[i].x = bh_curve_x(c->curve[k], i);
            point[i].y = height_of(m, k, i);
            widen(&m->y, point[i].y);
            if (isfinite(point[i].y))
                widen(&m->x, point[i].x);
            some |= isfinite(point[i].y);
        }
        if (!some)
            continue;
        const char *name = m->p->names ? m->p->names[k] : bh_curve_legend(m->p, k, m->arena);
        add_series(m, &(bh_figure_series){BH_SERIES_LINE, (int)k, name, n, NULL}, point);
    }
    return BH_OK;
}

/* From the lowest to the highest of all curves at point i; NAN where there are not two. */
static struct reach reach_of(const struct maker *m, size_t curves, size_t i)
{
    struct reach r = {INFINITY, -INFINITY, INFINITY};
    size_t some = 0;
    for (size_t k = 0; k < curves; k++)
        if (i < m->series[k].count && isfinite(m->series[k].point[i].y)) {
            widen(&r, m->series[k].point[i].y);
            some++;
        }
    return some > 1 ? r : (struct reach){NAN, NAN, NAN};
}

/* The band from the lowest to the highest of several curves. */
static bh_code take_band(struct maker *m)
{
    const size_t curves = m->out->series_count, n = curves ? m->series[0].count : 0;
    if (curves < 2)
        return BH_OK;
    double *number = bh_arena_take(m->arena, 3 * n, sizeof *number);
    bh_figure_band *band = bh_arena_take(m->arena, 1, sizeof *band);
    if (!number || !band)
        return no_memory(m);
    double *x = number, *low = number + n, *high = number + 2 * n;
    for (size_t i = 0; i < n; i++) {
        const struct reach at = reach_of(m, curves, i);
        x[i] = m->series[0].point[i].x;
        low[i] = at.lo;
        high[i] = at.hi;
    }
    m->band = number;
    *band = (bh_figure_band){"spread of these models", n, x, low, high};
    m->out->band = band;
    m->out->band_count = 1;
    return BH_OK;
}

/* --- settings --- */

/* A point with its bars; those that reach to 0 are cut at the frame rather than widen it. */
static void widen_to(struct maker *m, const bh_figure_point *p)
{
    const double half = fmax(p->inner, p->outer);
    widen(&m->x, p->x);
    widen(&m->y, p->y);
    widen(&m->y, p->y + half);
    if (p->y - half > 0.1 * p->y || p->y < 0.0)
        widen(&m->y, p->y - half);
}

static void take_point(struct maker *m, bool bins, size_t row, double x)
{
    const bh_table *t = m->p->table;
    bh_figure_point p = {x, bh_shown_number(t, bins, row, m->p->shown), 0.0, 0.0};
    if (!isfinite(p.y) || !isfinite(x)) {
        if (m->p->shown != BH_SHOWN_MERIT)
            m->reason = bh_table_reason(t, bins, row, (bh_column_id)m->p->shown);
        return;
    }
    if (bh_shown_measured(m->p->shown)) {
        const double stat = bh_table_number(t, bins, row, BH_COL_STATISTICAL),
                     syst = bh_table_number(t, bins, row, BH_COL_SYSTEMATIC);
        p.inner = isfinite(stat) ? stat * fabs(p.y) : 0.0;
        p.outer =
            isfinite(syst) && isfinite(stat) && syst > 0.0 ? hypot(stat, syst) * fabs(p.y) : 0.0;
        m->systematic = m->systematic || p.outer > 0.0;
    }
    widen_to(m, &p);
    m->planned[m->planned_count++] = p;
}

static bh_code take_span(struct maker *m, const bh_setting *setting, const bh_stand *stand)
{
    const size_t n = (size_t)stand->edges;
    double *edges = bh_arena_take(m->arena, n + 1, sizeof *edges);
    if (!edges)
        return no_memory(m);
    memcpy(edges, stand->edge, n * sizeof *edges);
    m->edges[m->out->span_count] = edges;
    m->spans[m->out->span_count++] =
        (bh_figure_span){setting->name, stand->from, stand->to, n, edges};
    widen(&m->x, stand->from);
    widen(&m->x, stand->to);
    return BH_OK;
}

/* The bins of row `whole` of a ring, by their own angle or Q2. */
static void take_ring(struct maker *m, const bh_place *whole)
{
    const bh_table *t = m->p->table;
    for (size_t row = 0; row < bh_table_rows(t, true); row++) {
        const bh_place at = bh_table_place(t, true, row);
        if (at.setting == whole->setting && at.arm == whole->arm)
            take_point(m, true, row,
                       bh_table_number(t, true, row,
                                       (bh_column_id)bh_curve_variable(m->p->curves->against)));
    }
}

/* One row of the table, where it lies on the curve. */
static bh_code take_row(struct maker *m, const bh_stand_origin *origin, size_t row)
{
    const bh_place at = bh_table_place(m->p->table, false, row);
    const bh_setting *setting = &bh_table_plan(m->p->table)->settings[at.setting];
    bh_stand stand;
    if (!bh_stand_on(origin, setting, &setting->arms[at.arm], &stand))
        return BH_OK;
    if (take_span(m, setting, &stand))
        return BH_ENOMEM;
    if (isnan(stand.at))
        take_ring(m, &at);
    else
        take_point(m, false, row, stand.at);
    return BH_OK;
}

static bh_code take_settings(struct maker *m)
{
    const bh_table *t = m->p->table;
    const bh_curves *c = m->p->curves;
    const bh_stand_origin origin = {c->setting, c->arm, c->against};
    const size_t rows = bh_table_rows(t, false);
    m->planned = bh_arena_take(m->arena, rows + bh_table_rows(t, true) + 1, sizeof *m->planned);
    m->spans = bh_arena_take(m->arena, rows + 1, sizeof *m->spans);
    m->edges = bh_arena_take(m->arena, rows + 1, sizeof *m->edges);
    if (!m->planned || !m->spans || !m->edges)
        return no_memory(m);
    for (size_t row = 0; row < rows; row++)
        if (take_row(m, &origin, row))
            return BH_ENOMEM;
    m->out->span = m->spans;
    m->out->span_name = c->against == BH_AGAINST_ANGLE || c->against == BH_AGAINST_Q2
                            ? "settings: acceptance and bins"
                            : "settings";
    const char *name = !bh_shown_measured(m->p->shown) ? "planned"
                       : m->systematic ? "planned; statistical and total uncertainty"
                                       : "planned; statistical uncertainty";
    if (m->planned_count)
        add_series(m, &(bh_figure_series){BH_SERIES_PLANNED, 0, name, m->planned_count, NULL},
                   m->planned);
    return BH_OK;
}

/* --- published points --- */

/* Those of one source; returns how many. */
static size_t take_source(struct maker *m, size_t source, bh_figure_point *point)
{
    size_t n = 0;
    for (size_t i = 0; i < m->p->measured->count; i++) {
        const bh_measured_point *p = &m->p->measured->point[i];
        if (p->source != source)
            continue;
        point[n] = (bh_figure_point){p->x, p->y, p->uncertainty, 0.0};
        widen_to(m, &point[n++]);
    }
    return n;
}

static bh_code take_measured(struct maker *m)
{
    const bh_measured *all = m->p->measured;
    for (size_t s = 0; all && s < all->source_count; s++) {
        bh_figure_point *point = bh_arena_take(m->arena, all->count, sizeof *point);
        if (!point)
            return no_memory(m);
        const size_t n = take_source(m, s, point);
        const char *name = all->source[s][0]     ? all->source[s]
                           : m->p->measured_name ? m->p->measured_name
                                                 : "published";
        add_series(m, &(bh_figure_series){BH_SERIES_PUBLISHED, (int)s + 1, name, n, NULL}, point);
    }
    return BH_OK;
}

/* --- axes --- */

static void scale_all(struct maker *m, double x, double y)
{
    for (size_t s = 0; s < m->out->series_count; s++)
        for (size_t i = 0; i < m->series[s].count; i++) {
            const bh_figure_point p = m->points[s][i];
            m->points[s][i] = (bh_figure_point){p.x * x, p.y * y, p.inner * y, p.outer * y};
        }
    const size_t n = m->out->band_count && m->band ? m->out->band[0].count : 0;
    for (size_t i = 0; i < 3 * n; i++)
        m->band[i] *= i < n ? x : y;
    for (size_t i = 0; i < m->out->span_count; i++) {
        m->spans[i].from *= x;
        m->spans[i].to *= x;
        for (size_t k = 0; k < m->spans[i].edge_count; k++)
            m->edges[i][k] *= x;
    }
}

/* What varies begins and ends close to what is drawn. */
static bh_axis close_around(double lo, double hi, bool logarithmic)
{
    const double room = 0.02;
    if (!(hi - lo > 1e-6 * fabs(hi)))
        return bh_axis_around(lo, hi, logarithmic);
    if (logarithmic) {
        const double wider = pow(hi / lo, room);
        return (bh_axis){lo / wider, hi * wider, true};
    }
    const double wider = room * (hi - lo);
    return (bh_axis){lo >= 0.0 ? fmax(lo - wider, 0.0) : lo - wider, hi + wider, false};
}

static void choose_axes(struct maker *m)
{
    bh_figure *f = m->out;
    const bool x_log = m->p->curves->against == BH_AGAINST_ENERGY && m->x.lo > 0.0 &&
                       m->x.hi > 2.0 * m->x.lo,
               y_log = m->y.lo >= 0.0 && m->y.hi > logarithmic_from * m->y.least;
    const double lowest =
        y_log ? fmax(m->y.least, m->y.hi / most_decades) : m->y.lo; /* a zero leaves the frame */
    const bh_shown_unit x = bh_shown_prefix(bh_curve_variable(m->p->curves->against), m->x.lo,
                                            m->x.hi, x_log),
                        y = bh_shown_prefix(m->p->shown, lowest, m->y.hi, y_log);
    f->x = (bh_figure_scale){bh_shown_words(bh_curve_variable(m->p->curves->against)),
                             bh_curve_say(m->arena, "%s", x.unit),
                             close_around(m->x.lo * x.scale, m->x.hi * x.scale, x_log)};
    f->y = (bh_figure_scale){bh_shown_words(m->p->shown), bh_curve_say(m->arena, "%s", y.unit),
                             bh_axis_around(lowest * y.scale, m->y.hi * y.scale, y_log)};
    scale_all(m, x.scale, y.scale);
}

bh_code bh_curve_figure(const bh_curve_picture *picture, bh_arena *arena, bh_figure *out,
                        bh_error *err)
{
    struct maker *m = bh_arena_take(arena, 1, sizeof *m);
    *out = (bh_figure){.title = ""};
    if (!m)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    const struct reach nothing = {INFINITY, -INFINITY, INFINITY};
    *m = (struct maker){
        .p = picture, .arena = arena, .out = out, .err = err, .x = nothing, .y = nothing};
    out->series = m->series;
    bh_code bad = take_curves(m);
    bad = bad ? bad : take_band(m);
    bad = bad ? bad : take_settings(m);
    bad = bad ? bad : take_measured(m);
    if (bad)
        return bad;
    if (!(m->y.lo <= m->y.hi) || !(m->x.lo <= m->x.hi))
        return bh_fail(
            err, BH_EDOMAIN, "there is nothing to draw: %s is empty all along the curve%s%s",
            bh_shown_key(picture->shown), m->reason ? ": " : "", m->reason ? m->reason : "");
    choose_axes(m);
    bad = bh_figure_add_ratio(out, arena, err);
    if (!bad)
        bh_curve_words(picture, m->planned_count, arena, out);
    return bad;
}
