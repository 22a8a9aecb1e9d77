/* cmd_curve.c - beamhours curve PLAN: a column against what varies, as text or CSV. */
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include <sysexits.h>

#include "beamhours/base/number.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/physics/structure.h"
#include "beamhours/report/csv.h"
#include "beamhours/run/curve.h"

enum { MOST = 8, CELL = 16, NARROW = 12, MARKS = 12 };

struct curves {
    bh_against against;
    bh_column_id column;
    char *structures; /* own copy of the list; NULL: the plan's choice */
    const char *name[MOST];
    bh_curve *curve[MOST];
    size_t count;
};

static int variable(const bh_arguments *a, bh_against *out)
{
    static const char *const names[] = {"angle", "energy", "q2", "epsilon"};
    const char *given = a->value[BH_OPT_AGAINST];
    *out = BH_AGAINST_ANGLE;
    if (!given)
        return 0;
    for (int i = 0; i < 4; i++)
        if (strcmp(names[i], given) == 0) {
            *out = (bh_against)i;
            return 0;
        }
    return bh_usage(a, "--against is angle, energy, q2 or epsilon");
}

static int column(const bh_arguments *a, bh_column_id *out)
{
    const char *given = a->value[BH_OPT_SHOW];
    char sentence[160];
    *out = BH_COL_POINT_CROSS_SECTION;
    if (!given)
        return 0;
    const int id = bh_column_find(given);
    if (id >= 0 && bh_column_at(id)->kind == BH_CELL_NUMBER) {
        *out = (bh_column_id)id;
        return 0;
    }
    const char *near = bh_column_suggest(given);
    (void)snprintf(sentence, sizeof sentence, "--show: no column \"%.60s\" with numbers%s%s%s",
                   given, near ? "; did you mean " : "", near ? near : "", near ? "?" : "");
    return bh_usage(a, sentence);
}

/* Splits --structure A,B. */
static int structures(const bh_arguments *a, struct curves *c)
{
    const char *given = a->value[BH_OPT_STRUCTURE];
    c->count = 1;
    if (!given)
        return 0;
    c->structures = strdup(given);
    if (!c->structures)
        return bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
    c->count = 0;
    for (char *s = c->structures; s;) {
        char *comma = strchr(s, ',');
        if (comma)
            *comma = '\0';
        if (!*s)
            return bh_usage(a, "--structure has an empty name; `beamhours models` lists them");
        if (c->count == MOST)
            return bh_usage(a, "--structure takes 8 names at most");
        c->name[c->count++] = s;
        s = comma ? comma + 1 : NULL;
    }
    return 0;
}

static int compute(const bh_arguments *a, const bh_plan *plan, struct curves *c)
{
    for (size_t i = 0; i < c->count; i++) {
        const bh_curve_request r = {a->value[BH_OPT_SETTING], a->value[BH_OPT_ARM], c->against,
                                    c->name[i]};
        bh_error err = {.code = BH_OK};
        c->curve[i] = bh_curve_new(plan, &r, &err);
        if (!c->curve[i])
            return err.code == BH_EDOMAIN ? bh_usage(a, err.text) : bh_complain(stderr, &err);
    }
    return 0;
}

static void as_csv(const struct curves *c, bh_text *out)
{
    const char *key = bh_column_at((int)c->column)->key;
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
            const double y = bh_curve_y(c->curve[k], i, c->column);
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
    double lo, hi;
    bool logarithmic;
};

static struct span span_of(const struct curves *c)
{
    struct span s = {INFINITY, -INFINITY, true};
    for (size_t k = 0; k < c->count; k++)
        for (size_t i = 0; i < bh_curve_count(c->curve[k]); i++) {
            const double y = bh_curve_y(c->curve[k], i, c->column);
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
static void plot_row(const struct curves *c, const struct span *s, size_t i, int width,
                     bh_text *out)
{
    char row[128];
    memset(row, ' ', sizeof row);
    for (size_t k = c->count; k-- > 0;) {
        const double y = bh_curve_y(c->curve[k], i, c->column);
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

static void text_row(const struct curves *c, const struct span *s, size_t i, int plot, bh_text *out)
{
    char number[BH_NUMBER_SIZE];
    (void)bh_number_digits(bh_curve_x(c->curve[0], i), 5, number, sizeof number);
    bh_text_appendf(out, "%*s", CELL, number);
    for (size_t k = 0; k < c->count; k++) {
        const double y = bh_curve_y(c->curve[k], i, c->column);
        (void)bh_number_digits(y, 5, number, sizeof number);
        bh_text_appendf(out, " %*s", cell_width(c->name[k]), isfinite(y) ? number : "-");
    }
    plot_row(c, s, i, plot, out);
    const char *marks = bh_curve_marks(c->curve[0], i);
    bh_text_appendf(out, "%s%s\n", marks[0] ? " " : "", marks);
}

static void as_text(const struct curves *c, int width, bh_text *out)
{
    const struct span s = span_of(c);
    int plot = width - CELL - MARKS - 3;
    bh_text_appendf(out, "%s against %s; plot %s, settings at the right\n%*s",
                    bh_column_at((int)c->column)->key, bh_curve_key(c->against),
                    s.logarithmic ? "logarithmic" : "linear", CELL, bh_curve_key(c->against));
    for (size_t k = 0; k < c->count; k++) {
        bh_text_appendf(out, " %*s", cell_width(c->name[k]), c->name[k] ? c->name[k] : "value");
        plot -= 1 + cell_width(c->name[k]);
    }
    bh_text_append(out, "\n");
    plot = plot < 10 ? 10 : plot > 100 ? 100 : plot;
    for (size_t i = 0; i < bh_curve_count(c->curve[0]); i++)
        text_row(c, &s, i, plot, out);
}

static int show(const bh_arguments *a, const char *format, const bh_plan *plan)
{
    struct curves c = {.count = 0};
    bh_text out = {0};
    int status = variable(a, &c.against);
    if (status == 0)
        status = column(a, &c.column);
    if (status == 0)
        status = structures(a, &c);
    if (status == 0)
        status = compute(a, plan, &c);
    if (status == 0) {
        if (strcmp(format, "csv") == 0)
            as_csv(&c, &out);
        else
            as_text(&c, bh_places_width(), &out);
        status = bh_output(&out, a->value[BH_OPT_OUTPUT]);
    }
    for (size_t k = 0; k < MOST; k++)
        bh_curve_free(c.curve[k]);
    free(c.structures);
    return status;
}

int bh_cmd_curve(const bh_arguments *arguments)
{
    const char *format = bh_arguments_format(arguments, BH_OPT_CURVE_FORMAT);
    if (!format)
        return EX_USAGE;
    if (arguments->word_count != 1)
        return bh_usage(arguments, "needs one plan (or - for standard input)");
    bh_input in;
    int status = bh_input_open(arguments->words[0], &in);
    if (status == 0)
        status = bh_input_plan(&in, arguments);
    if (status == 0) {
        bh_say_diags(stderr, in.diags);
        status = show(arguments, format, in.plan);
    }
    bh_input_close(&in);
    return status;
}
