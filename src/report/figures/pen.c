/* pen.c - text by pango without hinting, so that it is the same size on every surface. */
#include "beamhours/report/pen.h"

#include <math.h>

#include "beamhours/units/constants.h"

enum { CORNERS = 12 };

static const char font_family[] = "DejaVu Sans";
static const double mark_radius = 2.9, mark_line = 1.0;

bh_code bh_pen_open(cairo_t *to, bh_pen *out, bh_error *err)
{
    bh_pen pen = {to, pango_cairo_create_layout(to)};
    cairo_font_options_t *options = cairo_font_options_create();
    if (cairo_status(to) || !pen.text || cairo_font_options_status(options)) {
        bh_pen_close(&pen);
        cairo_font_options_destroy(options);
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    }
    cairo_font_options_set_antialias(options, CAIRO_ANTIALIAS_GRAY);
    cairo_font_options_set_hint_style(options, CAIRO_HINT_STYLE_NONE);
    cairo_font_options_set_hint_metrics(options, CAIRO_HINT_METRICS_OFF);
    PangoContext *context = pango_layout_get_context(pen.text);
    pango_cairo_context_set_font_options(context, options);
    pango_cairo_context_set_resolution(context, 72.0);
    pango_context_set_round_glyph_positions(context, FALSE);
    pango_layout_context_changed(pen.text);
    cairo_font_options_destroy(options);
    *out = pen;
    return BH_OK;
}

void bh_pen_close(bh_pen *pen)
{
    if (pen->text)
        g_object_unref(pen->text);
    pen->text = NULL;
}

static void set(const bh_pen *pen, const bh_lettering *how, const char *text)
{
    PangoFontDescription *font = pango_font_description_new();
    pango_font_description_set_family_static(font, font_family);
    pango_font_description_set_weight(font, how->bold ? PANGO_WEIGHT_BOLD : PANGO_WEIGHT_NORMAL);
    pango_font_description_set_absolute_size(font, how->size * PANGO_SCALE);
    pango_layout_set_font_description(pen->text, font);
    pango_font_description_free(font);
    const bool wrapped = how->wide > 0.0;
    pango_layout_set_width(pen->text, wrapped ? (int)(how->wide * PANGO_SCALE) : -1);
    pango_layout_set_wrap(pen->text, PANGO_WRAP_WORD_CHAR);
    pango_layout_set_height(pen->text, wrapped ? -2 : -1);
    pango_layout_set_ellipsize(pen->text, wrapped ? PANGO_ELLIPSIZE_END : PANGO_ELLIPSIZE_NONE);
    pango_layout_set_text(pen->text, text, -1);
}

static void size_of(const bh_pen *pen, double *wide, double *high)
{
    PangoRectangle around;
    pango_layout_get_extents(pen->text, NULL, &around);
    *wide = (double)around.width / PANGO_SCALE;
    *high = (double)around.height / PANGO_SCALE;
}

void bh_pen_measure(const bh_pen *pen, const bh_lettering *how, const char *text, double *wide,
                    double *high)
{
    double w = 0.0, h = 0.0;
    set(pen, how, text);
    size_of(pen, &w, &h);
    if (wide)
        *wide = w;
    if (high)
        *high = h;
}

void bh_pen_write(const bh_pen *pen, const bh_lettering *how, const char *text,
                  const bh_text_place *at)
{
    double wide = 0.0, high = 0.0;
    set(pen, how, text);
    size_of(pen, &wide, &high);
    bh_pen_grey(pen, how->grey);
    cairo_save(pen->to);
    cairo_translate(pen->to, at->x, at->y);
    if (at->upright) {
        cairo_rotate(pen->to, -(BH_PI / 2.0));
        cairo_move_to(pen->to, -wide / 2.0, 0.0);
    } else {
        const double left = at->align == BH_ALIGN_LEFT     ? 0.0
                            : at->align == BH_ALIGN_MIDDLE ? -wide / 2.0
                                                           : -wide;
        cairo_move_to(pen->to, left, at->centred ? -high / 2.0 : 0.0);
    }
    pango_cairo_update_layout(pen->to, pen->text);
    pango_cairo_show_layout(pen->to, pen->text);
    cairo_restore(pen->to);
    cairo_new_path(pen->to);
}

void bh_pen_grey(const bh_pen *pen, double grey)
{
    cairo_set_source_rgb(pen->to, grey, grey, grey);
}

void bh_pen_colour(const bh_pen *pen, const bh_figure_style *style)
{
    cairo_set_source_rgb(pen->to, style->red / 255.0, style->green / 255.0, style->blue / 255.0);
}

void bh_pen_strokes(const bh_pen *pen, size_t count, const bh_stroke *s)
{
    if (count == 0)
        return;
    cairo_set_line_width(pen->to, s->thick);
    for (size_t i = 0; i < count; i++) {
        cairo_move_to(pen->to, s[i].x1, s[i].y1);
        cairo_line_to(pen->to, s[i].x2, s[i].y2);
    }
    cairo_stroke(pen->to);
}

void bh_pen_stroke(const bh_pen *pen, const bh_stroke *stroke)
{
    bh_pen_strokes(pen, 1, stroke);
}

/* --- marks --- */

/* Corners on the unit circle, in turns; two strokes for crosses. */
struct outline {
    int corners;
    double first, scale; /* turn of the first corner; size in radii */
};

static void polygon(cairo_t *to, struct outline o, double x, double y)
{
    for (int i = 0; i < o.corners && i < CORNERS; i++) {
        const double turn = 2.0 * BH_PI * (o.first + (double)i / o.corners);
        const double px = x + o.scale * mark_radius * cos(turn),
                     py = y + o.scale * mark_radius * sin(turn);
        if (i == 0)
            cairo_move_to(to, px, py);
        else
            cairo_line_to(to, px, py);
    }
    cairo_close_path(to);
}

static void arms(cairo_t *to, double first, double x, double y)
{
    for (int i = 0; i < 2; i++) {
        const double turn = 2.0 * BH_PI * (first + 0.25 * i), dx = 1.2 * mark_radius * cos(turn),
                     dy = 1.2 * mark_radius * sin(turn);
        cairo_move_to(to, x - dx, y - dy);
        cairo_line_to(to, x + dx, y + dy);
    }
}

void bh_pen_mark(const bh_pen *pen, bh_mark_shape shape, bool full, double x, double y)
{
    static const struct outline outlines[] = {
        [BH_MARK_SQUARE] = {4, 0.125, 1.25}, [BH_MARK_TRIANGLE] = {3, 0.75, 1.4},
        [BH_MARK_DIAMOND] = {4, 0.0, 1.35},  [BH_MARK_DOWN] = {3, 0.25, 1.4},
        [BH_MARK_HEXAGON] = {6, 0.0, 1.15},
    };
    const bool crossed = shape == BH_MARK_CROSS || shape == BH_MARK_PLUS;
    cairo_set_line_width(pen->to, crossed ? 1.4 * mark_line : mark_line);
    if (crossed)
        arms(pen->to, shape == BH_MARK_CROSS ? 0.125 : 0.0, x, y);
    else if (shape == BH_MARK_CIRCLE)
        cairo_arc(pen->to, x, y, mark_radius, 0.0, 2.0 * BH_PI);
    else
        polygon(pen->to, outlines[shape], x, y);
    if (!crossed && full) {
        cairo_fill_preserve(pen->to);
    } else if (!crossed) {
        cairo_pattern_t *colour = cairo_pattern_reference(cairo_get_source(pen->to));
        bh_pen_grey(pen, 1.0);
        cairo_fill_preserve(pen->to);
        cairo_set_source(pen->to, colour);
        cairo_pattern_destroy(colour);
    }
    cairo_stroke(pen->to);
}
