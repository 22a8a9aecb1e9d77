/* figure_draw.c - one drawing for all surfaces, from the background to the foreground. */
#include "beamhours/report/figure_draw.h"

#include <math.h>

#include "beamhours/report/easel.h"

static const double frame_line = 0.8, grid_line = 0.4, bar_line = 0.9, thin_bar = 0.5;
static const double tick_long = 4.0, minor_long = 2.2, cap = 2.4;
static const double shade_grey = 0.945, grid_grey = 0.86, band_grey = 0.8;

static double at_x(const bh_easel *e, double x)
{
    return bh_figure_x(e->figure, e->l, x);
}

/* Kept near the frame: a bar may reach to minus infinity on a logarithmic axis. */
static double at_y(const bh_easel *e, double y)
{
    const bh_box *f = &e->l->frame;
    const double place = bh_figure_y(e->figure, e->l, y);
    if (isnan(place))
        return f->y + 2.0 * f->high;
    return fmin(fmax(place, f->y - f->high), f->y + 2.0 * f->high);
}

static void clip_to_frame(const bh_easel *e)
{
    const bh_box *f = &e->l->frame;
    cairo_save(e->pen->to);
    cairo_rectangle(e->pen->to, f->x, f->y, f->wide, f->high);
    cairo_clip(e->pen->to);
}

/* --- behind the curves --- */

static void shades(const bh_easel *e)
{
    const bh_box *f = &e->l->frame;
    bh_pen_grey(e->pen, shade_grey);
    for (size_t i = 0; i < e->figure->span_count; i++) {
        const bh_span_place *p = &e->l->spans[i];
        cairo_rectangle(e->pen->to, p->from, f->y, p->to - p->from, f->high);
    }
    cairo_fill(e->pen->to);
}

/* Strokes along x at the ticks: from `low` up or down by `by`. */
static void strokes_x(const bh_easel *e, double low, double by, double thick)
{
    bh_stroke s[BH_MOST_TICKS];
    for (int i = 0; i < e->l->x.count; i++) {
        const double x = at_x(e, e->l->x.tick[i].at);
        s[i] = (bh_stroke){x, low, x, low + by, thick};
    }
    bh_pen_strokes(e->pen, (size_t)e->l->x.count, s);
}

static void strokes_y(const bh_easel *e, double left, double by, double thick)
{
    bh_stroke s[BH_MOST_TICKS];
    for (int i = 0; i < e->l->y.count; i++) {
        const double y = at_y(e, e->l->y.tick[i].at);
        s[i] = (bh_stroke){left, y, left + by, y, thick};
    }
    bh_pen_strokes(e->pen, (size_t)e->l->y.count, s);
}

static void grid(const bh_easel *e)
{
    const bh_box *f = &e->l->frame;
    bh_pen_grey(e->pen, grid_grey);
    strokes_x(e, f->y, f->high, grid_line);
    strokes_y(e, f->x, f->wide, grid_line);
}

/* One piece of a band without a gap: forth along its upper edge, back along the lower one. */
static void band_piece(const bh_easel *e, const bh_figure_band *b, size_t from, size_t to)
{
    if (to - from < 2)
        return;
    for (size_t i = from; i < to; i++)
        cairo_line_to(e->pen->to, at_x(e, b->x[i]), at_y(e, b->high[i]));
    for (size_t i = to; i-- > from;)
        cairo_line_to(e->pen->to, at_x(e, b->x[i]), at_y(e, b->low[i]));
    cairo_close_path(e->pen->to);
    cairo_fill(e->pen->to);
}

static void bands(const bh_easel *e)
{
    bh_pen_grey(e->pen, band_grey);
    for (size_t n = 0; n < e->figure->band_count; n++) {
        const bh_figure_band *b = &e->figure->band[n];
        size_t from = 0;
        for (size_t i = 0; i <= b->count; i++) {
            if (i < b->count && isfinite(b->low[i]) && isfinite(b->high[i]))
                continue;
            band_piece(e, b, from, i);
            from = i + 1;
        }
    }
}

/* --- curves and points --- */

static void curve(const bh_easel *e, const bh_figure_series *s)
{
    bool open = false;
    bh_easel_dashes(e, bh_figure_style_at(s->style));
    for (size_t i = 0; i < s->count; i++) {
        if (!isfinite(s->point[i].y)) {
            open = false;
            continue;
        }
        const double x = at_x(e, s->point[i].x), y = at_y(e, s->point[i].y);
        if (open)
            cairo_line_to(e->pen->to, x, y);
        else
            cairo_move_to(e->pen->to, x, y);
        open = true;
    }
    cairo_stroke(e->pen->to);
    cairo_set_dash(e->pen->to, NULL, 0, 0.0);
}

/* A bar of `half` the length both ways, with caps or without. */
static void error_bar(const bh_easel *e, const bh_figure_point *p, double half, bool capped)
{
    if (!(half > 0.0))
        return;
    const double x = at_x(e, p->x), low = at_y(e, p->y - half), high = at_y(e, p->y + half);
    bh_pen_stroke(e->pen, &(bh_stroke){x, low, x, high, capped ? bar_line : thin_bar});
    if (!capped)
        return;
    bh_pen_stroke(e->pen, &(bh_stroke){x - cap, low, x + cap, low, bar_line});
    bh_pen_stroke(e->pen, &(bh_stroke){x - cap, high, x + cap, high, bar_line});
}

static void bars(const bh_easel *e, const bh_figure_series *s)
{
    bh_easel_points(e, s);
    for (size_t i = 0; i < s->count; i++) {
        const bh_figure_point *p = &s->point[i];
        if (!isfinite(p->y) || !isfinite(p->x))
            continue;
        error_bar(e, p, p->outer, false);
        error_bar(e, p, p->inner, true);
    }
}

/* Whole also where they stand on the frame. */
static void marks(const bh_easel *e, const bh_figure_series *s)
{
    const bh_box *f = &e->l->frame;
    bh_easel_points(e, s);
    for (size_t i = 0; i < s->count; i++) {
        const double x = at_x(e, s->point[i].x), y = at_y(e, s->point[i].y);
        if (isfinite(s->point[i].y) && x >= f->x && x <= f->x + f->wide && y >= f->y &&
            y <= f->y + f->high)
            bh_pen_mark(e->pen, bh_figure_style_at(s->style)->mark, s->kind == BH_SERIES_PLANNED, x,
                        y);
    }
}

/* --- in front --- */

static void x_ticks(const bh_easel *e, bool labels)
{
    const bh_lettering how = bh_figure_letters(BH_LETTERS_TICK);
    const double low = e->l->frame.y + e->l->frame.high;
    bh_stroke minor[BH_MOST_MINOR_TICKS];
    for (int i = 0; i < e->l->x.minor_count; i++) {
        const double x = at_x(e, e->l->x.minor[i]);
        minor[i] = (bh_stroke){x, low, x, low + minor_long, frame_line / 2.0};
    }
    bh_pen_strokes(e->pen, (size_t)e->l->x.minor_count, minor);
    strokes_x(e, low, tick_long, frame_line);
    for (int i = 0; labels && i < e->l->x.count; i++)
        bh_pen_write(e->pen, &how, e->l->x.tick[i].label,
                     &(bh_text_place){.x = at_x(e, e->l->x.tick[i].at),
                                      .y = low + tick_long + 1.0,
                                      .align = BH_ALIGN_MIDDLE});
}

static void y_ticks(const bh_easel *e)
{
    const bh_lettering how = bh_figure_letters(BH_LETTERS_TICK);
    const double left = e->l->frame.x;
    bh_stroke minor[BH_MOST_MINOR_TICKS];
    bh_pen_grey(e->pen, 0.0);
    for (int i = 0; i < e->l->y.minor_count; i++) {
        const double y = at_y(e, e->l->y.minor[i]);
        minor[i] = (bh_stroke){left - minor_long, y, left, y, frame_line / 2.0};
    }
    bh_pen_strokes(e->pen, (size_t)e->l->y.minor_count, minor);
    strokes_y(e, left, -tick_long, frame_line);
    for (int i = 0; i < e->l->y.count; i++)
        bh_pen_write(e->pen, &how, e->l->y.tick[i].label,
                     &(bh_text_place){.x = left - tick_long - 2.0,
                                      .y = at_y(e, e->l->y.tick[i].at),
                                      .align = BH_ALIGN_RIGHT,
                                      .centred = true});
}

static void axes(const bh_easel *e, bool labels)
{
    const bh_box *f = &e->l->frame;
    const bh_lettering how = bh_figure_letters(BH_LETTERS_AXIS);
    char words[200];
    bh_pen_grey(e->pen, 0.0);
    cairo_set_line_width(e->pen->to, frame_line);
    cairo_rectangle(e->pen->to, f->x, f->y, f->wide, f->high);
    cairo_stroke(e->pen->to);
    x_ticks(e, labels);
    y_ticks(e);
    bh_figure_axis_words(&e->figure->x, words, sizeof words);
    if (labels)
        bh_pen_write(e->pen, &how, words,
                     &(bh_text_place){.x = f->x + f->wide / 2.0,
                                      .y = e->l->x_words_y,
                                      .align = BH_ALIGN_MIDDLE});
    bh_figure_axis_words(&e->figure->y, words, sizeof words);
    bh_pen_write(e->pen, &how, words,
                 &(bh_text_place){.x = 6.0, .y = f->y + f->high / 2.0, .upright = true});
}

/* A frame and all within it; `labels`: of the x axis. */
static void framed(const bh_easel *e, bool labels)
{
    clip_to_frame(e);
    shades(e);
    grid(e);
    bands(e);
    for (size_t i = 0; i < e->figure->series_count; i++)
        if (e->figure->series[i].kind == BH_SERIES_LINE)
            curve(e, &e->figure->series[i]);
    cairo_restore(e->pen->to);
    axes(e, labels);
    clip_to_frame(e);
    for (size_t i = 0; i < e->figure->series_count; i++)
        if (e->figure->series[i].kind != BH_SERIES_LINE)
            bars(e, &e->figure->series[i]);
    cairo_restore(e->pen->to);
    for (size_t i = 0; i < e->figure->series_count; i++)
        if (e->figure->series[i].kind != BH_SERIES_LINE)
            marks(e, &e->figure->series[i]);
}

static void draw(const bh_easel *e)
{
    const bh_figure *below = e->figure->below;
    framed(e, !below);
    if (below) {
        bh_figure_layout l = *e->l;
        l.frame = l.below;
        l.y = l.below_y;
        framed(&(bh_easel){below, &l, e->pen}, true);
    }
    bh_easel_around(e);
}

bh_code bh_figure_draw(const bh_figure *figure, cairo_t *to, bh_error *err)
{
    bh_pen pen;
    bh_figure_layout layout;
    bh_code bad = bh_pen_open(to, &pen, err);
    if (bad)
        return bad;
    bad = bh_figure_layout_make(figure, &pen, &layout, err);
    if (!bad) {
        cairo_save(to);
        draw(&(bh_easel){figure, &layout, &pen});
        cairo_restore(to);
        if (cairo_status(to))
            bad = bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    }
    bh_figure_layout_free(&layout);
    bh_pen_close(&pen);
    return bad;
}

bh_code bh_figure_size(const bh_figure *figure, double *wide, double *high, bh_error *err)
{
    cairo_surface_t *nowhere = cairo_recording_surface_create(CAIRO_CONTENT_COLOR, NULL);
    cairo_t *to = cairo_create(nowhere);
    bh_pen pen;
    bh_figure_layout layout = {0};
    bh_code bad = bh_pen_open(to, &pen, err);
    if (!bad) {
        bad = bh_figure_layout_make(figure, &pen, &layout, err);
        *wide = bad ? *wide : layout.wide;
        *high = bad ? *high : layout.high;
        bh_figure_layout_free(&layout);
        bh_pen_close(&pen);
    }
    cairo_destroy(to);
    cairo_surface_destroy(nowhere);
    return bad;
}
