/* curves_print.c - curves as CSV and as text with a plot of characters. */
#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/csv.h"
#include "beamhours/report/curves.h"

enum { CELL = 16, NARROW = 12, MARKS = 12 };

void bh_curves_csv(const bh_curves *c, int shown, bh_text *out)
{
    const char *key = bh_shown_key(shown);
    bh_text_append(out, bh_curve_key(c->against));
    for (size_t k = 0; k < c->count; k++) {
        bh_text head = {0};
        bh_text_appendf(&head, "%s%s%s", key, c->name[k] ? " " : "", c->name[k] ? c->name[k] : "");
        bh_text_append(out, ",");
        bh_csv_field(out, head.bytes ? head.bytes : key);
        bh_text_free(&head);
    }
    bh_text_append(out, ",settings\r\n");
    for (size_t i = 0; i < bh_curve_count(c->curve[0]); i++) {
        bh_text_append_number(out, bh_curve_x(c->curve[0], i));
        for (size_t k = 0; k < c->count; k++) {
            const double y = bh_shown_on_curve(c->curve[k], i, shown);
            bh_text_append(out, ",");
            if (isfinite(y))
                bh_text_append_number(out, y);
        }
        bh_text_append(out, ",");
        bh_csv_field(out, bh_curve_marks(c->curve[0], i));
        bh_text_append(out, "\r\n");
    }
}

/* Where the smallest and largest values lie; logarithmic where all are positive. */
struct span {
    int shown;
    double lo, hi;
    bool logarithmic;
};

static struct span span_of(const bh_curves *c, int shown)
{
    struct span s = {shown, INFINITY, -INFINITY, true};
    for (size_t k = 0; k < c->count; k++)
        for (size_t i = 0; i < bh_curve_count(c->curve[k]); i++) {
            const double y = bh_shown_on_curve(c->curve[k], i, shown);
            if (!isfinite(y))
                continue;
            s.lo = fmin(s.lo, y);
            s.hi = fmax(s.hi, y);
        }
    s.logarithmic = s.lo > 0.0;
    return s;
}

/* Returns 0 to 1 across the plot. */
static double place(const struct span *s, double y)
{
    if (!(s->hi > s->lo))
        return 0.5;
    return s->logarithmic ? log(y / s->lo) / log(s->hi / s->lo) : (y - s->lo) / (s->hi - s->lo);
}

/* A row of marks: a digit a curve where there are several. */
static void plot_row(const bh_curves *c, const struct span *s, size_t i, int width, bh_text *out)
{
    char row[128];
    memset(row, ' ', sizeof row);
    for (size_t k = c->count; k-- > 0;) {
        const double y = bh_shown_on_curve(c->curve[k], i, s->shown);
        if (isfinite(y))
            row[(int)(place(s, y) * (width - 1))] =
                (c->count > 1 ? "12345678" : "*")[c->count > 1 ? k : 0];
    }
    bh_text_appendf(out, " |%.*s|", width, row);
}

static int cell_width(const char *name)
{
    const int length = name ? (int)strlen(name) : 0;
    return length > NARROW ? length : NARROW;
}

static void text_row(const bh_curves *c, const struct span *s, size_t i, int plot, bh_text *out)
{
    char number[BH_NUMBER_SIZE];
    (void)bh_number_digits(bh_curve_x(c->curve[0], i), 5, number, sizeof number);
    bh_text_appendf(out, "%*s", CELL, number);
    for (size_t k = 0; k < c->count; k++) {
        const double y = bh_shown_on_curve(c->curve[k], i, s->shown);
        (void)bh_number_digits(y, 5, number, sizeof number);
        bh_text_appendf(out, " %*s", cell_width(c->name[k]), isfinite(y) ? number : "-");
    }
    plot_row(c, s, i, plot, out);
    const char *marks = bh_curve_marks(c->curve[0], i);
    bh_text_appendf(out, "%s%s\n", marks[0] ? " " : "", marks);
}

void bh_curves_text(const bh_curves *c, int shown, int width, bh_text *out)
{
    const struct span s = span_of(c, shown);
    int plot = width - CELL - MARKS - 3;
    bh_text_appendf(out, "%s against %s; plot %s, settings at the right\n%*s", bh_shown_key(shown),
                    bh_curve_key(c->against), s.logarithmic ? "logarithmic" : "linear", CELL,
                    bh_curve_key(c->against));
    for (size_t k = 0; k < c->count; k++) {
        bh_text_appendf(out, " %*s", cell_width(c->name[k]), c->name[k] ? c->name[k] : "value");
        plot -= 1 + cell_width(c->name[k]);
    }
    bh_text_append(out, "\n");
    plot = plot < 10 ? 10 : plot > 100 ? 100 : plot;
    for (size_t i = 0; i < bh_curve_count(c->curve[0]); i++)
        text_row(c, &s, i, plot, out);
}
