/* figure_layout.c - the frame keeps its size; what stands around it makes the page higher. */
#include "beamhours/report/figure_layout.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double page_wide = 468.0; /* 6.5 inches: inside the margins of A4 and of letter */
static const double frame_high = 232.0, margin = 8.0, gap = 4.0;
static const double below_high = 96.0;
static const double tick_long = 4.0;
static const double named_lane = 9.5, bare_lane = 5.0, rail_high = 60.0;
static const double half_a_bar = 1.0; /* the shortest */
enum { MOST_NAMED_LANES = 6, MOST_LANES = 20 };

bh_lettering bh_figure_letters(bh_letters which)
{
    static const bh_lettering letters[] = {
        [BH_LETTERS_TITLE] = {10.5, true, 0.0, 0.0},
        [BH_LETTERS_SUBTITLE] = {8.5, false, 0.2, 0.0},
        [BH_LETTERS_AXIS] = {8.5, false, 0.0, 0.0},
        [BH_LETTERS_TICK] = {8.5, false, 0.0, 0.0},
        [BH_LETTERS_LEGEND] = {8.5, false, 0.0, 0.0},
        [BH_LETTERS_SPAN] = {6.5, false, 0.15, 0.0},
        [BH_LETTERS_FOOT] = {6.5, false, 0.3, 0.0},
    };
    bh_lettering chosen = letters[which];
    if (which == BH_LETTERS_TITLE || which == BH_LETTERS_SUBTITLE || which == BH_LETTERS_FOOT)
        chosen.wide = page_wide - 2.0 * margin;
    return chosen;
}

double bh_figure_x(const bh_figure *figure, const bh_figure_layout *layout, double x)
{
    return layout->frame.x + layout->frame.wide * bh_axis_place(&figure->x.axis, x);
}

double bh_figure_y(const bh_figure *figure, const bh_figure_layout *layout, double y)
{
    return layout->frame.y + layout->frame.high * (1.0 - bh_axis_place(&figure->y.axis, y));
}

/* --- ticks --- */

struct asker {
    const bh_pen *pen;
    bool upwards;
};

static double extent(void *asker, const char *label)
{
    const struct asker *a = asker;
    const bh_lettering how = bh_figure_letters(BH_LETTERS_TICK);
    double wide = 0.0, high = 0.0;
    bh_pen_measure(a->pen, &how, label, &wide, &high);
    return a->upwards ? high : wide;
}

static void choose(const bh_pen *pen, const bh_axis *axis, double length, bool upwards,
                   bh_ticks *out)
{
    struct asker asker = {pen, upwards};
    const bh_tick_room room = {length, upwards ? 3.0 : 9.0, upwards ? 21.0 : 34.0, extent, &asker};
    bh_ticks_choose(axis, &room, out);
}

static double widest_label(const bh_pen *pen, const bh_ticks *ticks)
{
    struct asker asker = {pen, false};
    double most = 0.0;
    for (int i = 0; i < ticks->count; i++)
        most = fmax(most, extent(&asker, ticks->tick[i].label));
    return most;
}

static double height(const bh_pen *pen, bh_letters which, const char *text)
{
    const bh_lettering how = bh_figure_letters(which);
    double high = 0.0;
    if (text[0])
        bh_pen_measure(pen, &how, text, NULL, &high);
    return high;
}

static double width(const bh_pen *pen, bh_letters which, const char *text)
{
    const bh_lettering how = bh_figure_letters(which);
    double wide = 0.0;
    bh_pen_measure(pen, &how, text, &wide, NULL);
    return wide;
}

/* --- lanes of spans --- */

struct order {
    double from;
    size_t number;
};

static int by_from(const void *a, const void *b)
{
    const struct order *x = a, *y = b;
    if (x->from < y->from || x->from > y->from)
        return x->from < y->from ? -1 : 1;
    return x->number < y->number ? -1 : x->number > y->number;
}

/* The bar on the page, cut to the frame, long enough to be seen. */
static void bar(const bh_figure *figure, const bh_figure_layout *l, size_t i, bh_span_place *p)
{
    const double left = l->frame.x, right = left + l->frame.wide;
    p->from = fmin(fmax(bh_figure_x(figure, l, figure->span[i].from), left), right);
    p->to = fmin(fmax(bh_figure_x(figure, l, figure->span[i].to), left), right);
    if (p->to - p->from < 2.0 * half_a_bar) {
        const double middle = (p->from + p->to) / 2.0;
        p->from = middle - half_a_bar;
        p->to = middle + half_a_bar;
    }
}

/* The name stands behind the bar; before it where the frame ends. */
static void place_name(const bh_figure_layout *l, double wide, bh_span_place *p, double *from,
                       double *to)
{
    *from = p->from;
    *to = p->to + gap / 2.0 + wide;
    p->name_align = BH_ALIGN_LEFT;
    p->name_x = p->to + gap / 2.0;
    if (*to > l->wide - margin / 2.0) {
        p->name_align = BH_ALIGN_RIGHT;
        p->name_x = p->from - gap / 2.0;
        *from = p->name_x - wide;
        *to = p->to;
    }
}

/* Puts each span into the first lane with room; returns how many lanes that takes. */
static int assign(const bh_figure *figure, const bh_pen *pen, const struct order *order,
                  bh_figure_layout *l)
{
    double *end = calloc(figure->span_count + 1, sizeof *end);
    int lanes = 0;
    for (size_t n = 0; end && n < figure->span_count; n++) {
        const size_t i = order[n].number;
        bh_span_place *p = &l->spans[i];
        bar(figure, l, i, p);
        double from = p->from, to = p->to;
        if (l->names)
            place_name(l, width(pen, BH_LETTERS_SPAN, figure->span[i].name), p, &from, &to);
        int lane = 0;
        while (lane < lanes && end[lane] > from)
            lane++;
        lanes += lane == lanes;
        end[lane] = to + gap;
        p->lane = lane;
    }
    free(end);
    return end ? lanes : -1;
}

static bh_code rail(const bh_figure *figure, const bh_pen *pen, bh_figure_layout *l)
{
    struct order *order = calloc(figure->span_count + 1, sizeof *order);
    l->spans = calloc(figure->span_count + 1, sizeof *l->spans);
    if (!order || !l->spans) {
        free(order);
        return BH_ENOMEM;
    }
    for (size_t i = 0; i < figure->span_count; i++)
        order[i] = (struct order){figure->span[i].from, i};
    qsort(order, figure->span_count, sizeof *order, by_from);
    l->names = true;
    l->lanes = figure->span_count > (size_t)MOST_LANES * MOST_NAMED_LANES
                   ? MOST_NAMED_LANES + 1
                   : assign(figure, pen, order, l);
    l->lane_high = named_lane;
    if (l->lanes > MOST_NAMED_LANES) {
        l->names = false;
        const int needed = assign(figure, pen, order, l);
        for (size_t i = 0; i < figure->span_count; i++)
            l->spans[i].lane %= MOST_LANES;
        l->lanes = needed > MOST_LANES ? MOST_LANES : needed;
        l->lane_high = fmin(bare_lane, rail_high / fmax(needed, 1.0));
        l->lane_high = fmax(l->lane_high, rail_high / MOST_LANES);
    }
    free(order);
    return l->lanes < 0 ? BH_ENOMEM : BH_OK;
}

/* --- legend --- */

static void add_entry(bh_figure_layout *l, bh_entry_kind kind, size_t number, const char *name)
{
    if (name)
        l->entries[l->entry_count++] =
            (bh_legend_entry){.kind = kind, .number = number, .name = name};
}

/* Rows below the axis, as many entries in each as have room; returns the lower edge. */
static double flow(const bh_pen *pen, bh_figure_layout *l, double top)
{
    const double before = BH_LEGEND_SAMPLE + BH_LEGEND_GAP;
    double x = l->frame.x, y = top, high = 0.0;
    for (size_t i = 0; i < l->entry_count; i++) {
        bh_lettering how = bh_figure_letters(BH_LETTERS_LEGEND);
        how.wide = l->wide - margin - l->frame.x - before;
        double wide = 0.0, tall = 0.0;
        bh_pen_measure(pen, &how, l->entries[i].name, NULL, &tall);
        wide = fmin(width(pen, BH_LETTERS_LEGEND, l->entries[i].name), how.wide);
        if (x > l->frame.x && x + before + wide > l->wide - margin) {
            x = l->frame.x;
            y += high;
            high = 0.0;
        }
        l->entries[i].x = x;
        l->entries[i].y = y + tall / 2.0 + 1.0;
        l->entries[i].wide = how.wide;
        high = fmax(high, tall + 2.0);
        x += before + wide + 3.0 * BH_LEGEND_GAP;
    }
    return y + high;
}

static bh_code legend(const bh_figure *figure, bh_figure_layout *l)
{
    l->entries = calloc(figure->band_count + figure->series_count + 1, sizeof *l->entries);
    if (!l->entries)
        return BH_ENOMEM;
    for (size_t i = 0; i < figure->series_count; i++)
        add_entry(l, BH_ENTRY_SERIES, i, figure->series[i].name);
    for (size_t i = 0; i < figure->band_count; i++)
        add_entry(l, BH_ENTRY_BAND, i, figure->band[i].name);
    if (figure->span_count)
        add_entry(l, BH_ENTRY_SPAN, 0, figure->span_name);
    return BH_OK;
}

/* --- all of it --- */

static bool usable(const bh_axis *axis)
{
    return axis->from < axis->to && isfinite(axis->to - axis->from) &&
           (!axis->logarithmic || axis->from > 0.0);
}

/* The lower frame with its title above it; returns [pt] where the lowest frame ends. */
static double place_below(const bh_figure *figure, const bh_pen *pen, bh_figure_layout *l)
{
    const double end = l->frame.y + l->frame.high;
    if (!figure->below)
        return end;
    l->below = l->frame;
    l->below_title_y = end + gap + 1.0;
    l->below.y = l->below_title_y + height(pen, BH_LETTERS_SUBTITLE, figure->below->title) + 1.0;
    l->below.high = below_high;
    return l->below.y + below_high;
}

bh_code bh_figure_layout_make(const bh_figure *figure, const bh_pen *pen, bh_figure_layout *l,
                              bh_error *err)
{
    *l = (bh_figure_layout){.wide = page_wide};
    if (!usable(&figure->x.axis) || !usable(&figure->y.axis) ||
        (figure->below && !usable(&figure->below->y.axis)))
        return bh_fail(err, BH_EDOMAIN, "an axis of the figure has no length");
    choose(pen, &figure->y.axis, frame_high, true, &l->y);
    if (figure->below)
        choose(pen, &figure->below->y.axis, below_high, true, &l->below_y);
    const double tick_row = height(pen, BH_LETTERS_TICK, "0"),
                 words_row = height(pen, BH_LETTERS_AXIS, "X");
    l->frame.x = margin + words_row + gap +
                 fmax(widest_label(pen, &l->y), widest_label(pen, &l->below_y)) + tick_long + 2.0;
    l->frame.wide = page_wide - l->frame.x - 2.0 * margin;
    l->frame.high = frame_high;
    bh_code bad = rail(figure, pen, l);
    bad = bad ? bad : legend(figure, l);
    if (bad)
        return bh_fail(err, bad, "%s", bh_code_text(bad));
    choose(pen, &figure->x.axis, l->frame.wide, false, &l->x);
    l->title_y = margin;
    l->subtitle_y = l->title_y + height(pen, BH_LETTERS_TITLE, figure->title) + 1.0;
    const double above = l->subtitle_y + height(pen, BH_LETTERS_SUBTITLE, figure->subtitle);
    l->frame.y = above + 1.5 * gap + l->lanes * l->lane_high + (l->lanes ? gap : 0.0);
    const double bottom = place_below(figure, pen, l);
    l->x_words_y = bottom + tick_long + 1.0 + tick_row + 1.0;
    const double below = flow(pen, l, l->x_words_y + words_row + 1.5 * gap);
    l->foot_y = below + 1.5 * gap;
    l->high = ceil(l->foot_y + height(pen, BH_LETTERS_FOOT, figure->foot) + margin / 2.0);
    return BH_OK;
}

void bh_figure_layout_free(bh_figure_layout *layout)
{
    free(layout->spans);
    free(layout->entries);
    layout->spans = NULL;
    layout->entries = NULL;
}
