/* figure_around.c - what stands around the frame: bars of settings, legend, title, foot. */
#include <math.h>

#include "beamhours/report/easel.h"

static const double curve_line = 1.5, bar_line = 0.9, cap = 2.4;
static const double band_grey = 0.8, span_grey = 0.35;

static double at_x(const bh_easel *e, double x)
{
    return bh_figure_x(e->figure, e->l, x);
}

void bh_easel_dashes(const bh_easel *e, const bh_figure_style *style)
{
    bh_pen_colour(e->pen, style);
    cairo_set_line_width(e->pen->to, curve_line);
    cairo_set_dash(e->pen->to, style->dash, style->dash_count, 0.0);
}

void bh_easel_points(const bh_easel *e, const bh_figure_series *s)
{
    bh_pen_grey(e->pen, s->kind == BH_SERIES_PLANNED ? 0.0 : 0.2);
}

static double lane_y(const bh_easel *e, size_t i)
{
    return e->l->frame.y - 4.0 - e->l->lane_high * (e->l->spans[i].lane + 0.5);
}

static void upright(const bh_easel *e, double x, double y)
{
    const double tall = fmin(0.36 * e->l->lane_high, 2.6);
    cairo_move_to(e->pen->to, x, y - tall);
    cairo_line_to(e->pen->to, x, y + tall);
}

static void stroke_path(const bh_easel *e, double thick)
{
    cairo_set_line_width(e->pen->to, thick);
    cairo_stroke(e->pen->to);
}

/* The bars of the spans, then their ends, then the edges of their bins, each kind at once. */
static void span_bars(const bh_easel *e)
{
    const bh_figure *f = e->figure;
    bh_pen_grey(e->pen, span_grey);
    for (size_t i = 0; i < f->span_count; i++) {
        cairo_move_to(e->pen->to, e->l->spans[i].from, lane_y(e, i));
        cairo_line_to(e->pen->to, e->l->spans[i].to, lane_y(e, i));
    }
    stroke_path(e, fmin(0.3 * e->l->lane_high, 1.8));
    for (size_t i = 0; i < f->span_count; i++) {
        upright(e, e->l->spans[i].from, lane_y(e, i));
        upright(e, e->l->spans[i].to, lane_y(e, i));
    }
    stroke_path(e, 0.7);
    for (size_t i = 0; i < f->span_count; i++)
        for (size_t k = 0; k < f->span[i].edge_count; k++) {
            const double x = at_x(e, f->span[i].edge[k]);
            if (x > e->l->spans[i].from && x < e->l->spans[i].to)
                upright(e, x, lane_y(e, i));
        }
    stroke_path(e, 0.5);
}

static void span_names(const bh_easel *e)
{
    const bh_lettering how = bh_figure_letters(BH_LETTERS_SPAN);
    for (size_t i = 0; e->l->names && i < e->figure->span_count; i++)
        bh_pen_write(e->pen, &how, e->figure->span[i].name,
                     &(bh_text_place){.x = e->l->spans[i].name_x,
                                      .y = lane_y(e, i),
                                      .align = e->l->spans[i].name_align,
                                      .centred = true});
}

static void sample(const bh_easel *e, const bh_legend_entry *entry)
{
    const double x = entry->x, y = entry->y, end = x + BH_LEGEND_SAMPLE, middle = (x + end) / 2.0;
    if (entry->kind == BH_ENTRY_BAND) {
        bh_pen_grey(e->pen, band_grey);
        cairo_rectangle(e->pen->to, x, y - 3.5, BH_LEGEND_SAMPLE, 7.0);
        cairo_fill(e->pen->to);
        return;
    }
    if (entry->kind == BH_ENTRY_SPAN) {
        bh_pen_grey(e->pen, span_grey);
        bh_pen_stroke(e->pen, &(bh_stroke){x, y, end, y, 1.8});
        for (int i = 0; i < 4; i++) {
            const double at = x + BH_LEGEND_SAMPLE * i / 3.0;
            bh_pen_stroke(e->pen, &(bh_stroke){at, y - 2.6, at, y + 2.6, 0.6});
        }
        return;
    }
    const bh_figure_series *s = &e->figure->series[entry->number];
    const bh_figure_style *style = bh_figure_style_at(s->style);
    if (s->kind == BH_SERIES_LINE) {
        bh_easel_dashes(e, style);
        bh_pen_stroke(e->pen, &(bh_stroke){x, y, end, y, curve_line});
        cairo_set_dash(e->pen->to, NULL, 0, 0.0);
        return;
    }
    bh_easel_points(e, s);
    bh_pen_stroke(e->pen, &(bh_stroke){middle, y - 5.0, middle, y + 5.0, bar_line});
    bh_pen_stroke(e->pen, &(bh_stroke){middle - cap, y - 5.0, middle + cap, y - 5.0, bar_line});
    bh_pen_stroke(e->pen, &(bh_stroke){middle - cap, y + 5.0, middle + cap, y + 5.0, bar_line});
    bh_pen_mark(e->pen, style->mark, s->kind == BH_SERIES_PLANNED, middle, y);
}

static void write_left(const bh_easel *e, bh_letters which, const char *text, double y)
{
    const bh_lettering how = bh_figure_letters(which);
    if (text[0])
        bh_pen_write(e->pen, &how, text, &(bh_text_place){.x = 8.0, .y = y});
}

void bh_easel_around(const bh_easel *e)
{
    bh_lettering how = bh_figure_letters(BH_LETTERS_LEGEND);
    span_bars(e);
    span_names(e);
    for (size_t i = 0; i < e->l->entry_count; i++) {
        const bh_legend_entry *entry = &e->l->entries[i];
        sample(e, entry);
        how.wide = entry->wide;
        bh_pen_write(e->pen, &how, entry->name,
                     &(bh_text_place){.x = entry->x + BH_LEGEND_SAMPLE + BH_LEGEND_GAP,
                                      .y = entry->y,
                                      .centred = true});
    }
    write_left(e, BH_LETTERS_TITLE, e->figure->title, e->l->title_y);
    write_left(e, BH_LETTERS_SUBTITLE, e->figure->subtitle, e->l->subtitle_y);
    write_left(e, BH_LETTERS_FOOT, e->figure->foot, e->l->foot_y);
    const bh_lettering below = bh_figure_letters(BH_LETTERS_SUBTITLE);
    if (e->figure->below)
        bh_pen_write(e->pen, &below, e->figure->below->title,
                     &(bh_text_place){.x = e->l->frame.x, .y = e->l->below_title_y});
}
