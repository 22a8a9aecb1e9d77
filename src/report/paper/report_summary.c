/* report_summary.c - what a committee reads first. */
#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/alike.h"
#include "beamhours/report/input_words.h"
#include "beamhours/report/prefix.h"
#include "beamhours/report/reporting.h"
#include "beamhours/units/nuclide.h"

static void fact(bh_reporting *x, const char *name, const char *text)
{
    if (!text[0])
        return;
    bh_paper_cell(&x->w, name);
    bh_paper_cell(&x->w, text);
}

struct span {
    double low, high;
};

static void widen(struct span *s, double v)
{
    if (!isfinite(v))
        return;
    s->low = fmin(s->low, v);
    s->high = fmax(s->high, v);
}

static bool is_ring(const bh_reporting *x, const bh_place *p)
{
    return x->plan->settings[p->setting].arms[p->arm].arm.shape == BH_SHAPE_RING;
}

/* A ring reaches over its bins where kinematics is asked for. */
static struct span span_of(const bh_reporting *x, int column)
{
    struct span s = {INFINITY, -INFINITY};
    const bool reaches = column == BH_COL_Q2 || column == BH_COL_ANGLE;
    for (size_t i = 0; reaches && i < x->bins.row_count; i++) {
        const bh_place p = bh_table_place(x->table, true, x->bins.rows[i]);
        if (is_ring(x, &p))
            widen(&s, bh_selection_number(&x->bins, i, column));
    }
    for (size_t i = 0; i < x->view.row_count; i++)
        widen(&s, bh_selection_number(&x->view, i, column));
    return s;
}

/* "0.55 to 1.2 GeV2", as the tables show it; "" where no row says. */
static const char *range(bh_reporting *x, int column)
{
    const struct span s = span_of(x, column);
    const bh_shown_column c = bh_prefix_scale(&x->view, NULL, column);
    if (!(s.low <= s.high))
        return "";
    const char *low = bh_report_number(x, s.low * c.scale, c.digits);
    const char *high = bh_report_number(x, s.high * c.scale, c.digits);
    return strcmp(low, high) == 0 ? bh_paper_text(&x->w, "%s %s", low, c.unit)
                                  : bh_paper_text(&x->w, "%s to %s %s", low, high, c.unit);
}

/* Rows in the order of kinds, and the first of each. */
struct kinds {
    bh_alike *rows;
    bh_alike_head *heads;
    size_t count, kind_count;
};

static void sort_kinds(bh_reporting *x, struct kinds *k, bh_alike_order *order)
{
    k->heads = bh_arena_take(x->w.arena, k->count + 1, sizeof *k->heads);
    x->w.failed = x->w.failed || !k->heads || !bh_alike_sort(k->rows, k->count, order);
    if (!x->w.failed)
        k->kind_count = bh_alike_heads(k->rows, k->count, order, k->heads);
}

static struct kinds room_for(bh_reporting *x)
{
    struct kinds k = {bh_arena_take(x->w.arena, x->view.row_count + 1, sizeof *k.rows), NULL, 0, 0};
    x->w.failed = x->w.failed || !k.rows;
    return k;
}

static int by_name(const void *a, const void *b)
{
    return strcmp(a, b);
}

/* The different texts of a column, with commas. */
static const char *names(bh_reporting *x, int column)
{
    bh_text t = {0};
    struct kinds k = room_for(x);
    for (size_t i = 0; k.rows && i < x->view.row_count; i++) {
        const char *name = bh_selection_text(&x->view, i, column);
        if (name)
            k.rows[k.count++] = (bh_alike){name, i};
    }
    sort_kinds(x, &k, by_name);
    for (size_t i = 0; i < k.kind_count; i++)
        bh_text_appendf(&t, "%s%s", i ? ", " : "", (const char *)k.heads[i].first->what);
    return bh_paper_keep(&x->w, &t);
}

static const char *measured(bh_reporting *x)
{
    const size_t settings = x->plan->setting_count;
    return bh_paper_text(&x->w,
                         "%s scattering on %s in %zu setting%s; Q2 %s; angle of the detected "
                         "particle %s",
                         x->plan->settings[0].process.text, names(x, BH_COL_SCATTERER), settings,
                         settings > 1 ? "s" : "", range(x, BH_COL_Q2), range(x, BH_COL_ANGLE));
}

/* --- what each setting is measured for --- */

static const bh_setting_arm *arm_of(const bh_reporting *x, size_t row)
{
    const bh_place p = bh_table_place(x->table, false, x->view.rows[row]);
    return &x->plan->settings[p.setting].arms[p.arm];
}

static int by_wish(const void *a, const void *b)
{
    const bh_setting_arm *p = a, *q = b;
    if (p->want != q->want)
        return p->want < q->want ? -1 : 1;
    if (p->each_bin != q->each_bin)
        return p->each_bin ? 1 : -1;
    return (p->wanted.value > q->wanted.value) - (p->wanted.value < q->wanted.value);
}

/* The number as it would be written: five digits at most, no closing zeros. */
static void plain(bh_text *t, double value)
{
    char digits[BH_NUMBER_SIZE];
    double rounded = value;
    (void)bh_number_digits(value, 5, digits, sizeof digits);
    if (!bh_number_parse(digits, NULL, &rounded))
        bh_text_append_number(t, rounded);
}

/* "statistical uncertainty 0.2 %", "20 h on the full target" */
static void wish(const bh_setting_arm *a, bh_text *t)
{
    static const struct {
        const char *before, *behind;
        double scale;
    } words[] = {[BH_WANT_GOAL] = {"statistical uncertainty ", " %", 100.0},
                 [BH_WANT_TIME] = {"", " h on the full target", 1.0 / 3600.0},
                 [BH_WANT_CHARGE] = {"", " mC", 1e3},
                 [BH_WANT_COUNTS] = {"", " counts", 1.0}};
    bh_text_append(t, words[a->want].before);
    plain(t, a->wanted.value * words[a->want].scale);
    bh_text_appendf(t, "%s%s", words[a->want].behind,
                    a->each_bin && a->want == BH_WANT_GOAL ? " of each bin" : "");
}

/* The rows that have the same wish as the first of them, up to `end`. */
static void wish_in(bh_reporting *x, const bh_alike *first, const bh_alike *end, bh_text *t)
{
    enum { NAMED = 8 };
    size_t count = 0;
    for (const bh_alike *r = first; r < end && by_wish(r->what, first->what) == 0; r++)
        if (++count <= NAMED)
            bh_text_appendf(t, "%s%s", count > 1 ? "; " : " in ", bh_report_row_name(x, r->row));
    if (count > NAMED)
        bh_text_appendf(t, " and %zu more", count - NAMED);
}

/* Each wish with the rows that have it. */
static const char *wishes(bh_reporting *x)
{
    bh_text t = {0};
    struct kinds k = room_for(x);
    for (size_t i = 0; k.rows && i < x->view.row_count; i++)
        if (arm_of(x, i)->want != BH_WANT_NOTHING)
            k.rows[k.count++] = (bh_alike){arm_of(x, i), i};
    sort_kinds(x, &k, by_wish);
    for (size_t i = 0; i < k.kind_count; i++) {
        bh_text_append(&t, t.length ? ". " : "");
        wish(k.heads[i].first->what, &t);
        wish_in(x, k.heads[i].first, k.rows + k.count, &t);
    }
    return bh_paper_keep(&x->w, &t);
}

static const char *asked(bh_reporting *x)
{
    const bh_totals *t = x->totals;
    return bh_paper_text(&x->w,
                         "%s h of beam; %s h on the calendar with availability, changes and "
                         "contingency: %s shifts, %s weeks",
                         bh_report_hours(x, t->beam_hours), bh_report_hours(x, t->asked_hours),
                         bh_report_number(x, t->shifts, 3), bh_report_number(x, t->weeks, 3));
}

static const char *available(bh_reporting *x)
{
    const bh_totals *t = x->totals;
    if (!isfinite(t->available_hours))
        return "";
    const char *of = x->plan->schedule.available_is_beam ? "of beam" : "on the calendar";
    if (t->spare_hours < 0.0)
        return bh_paper_text(&x->w, "%s h %s: %s h less than is asked",
                             bh_report_hours(x, t->available_hours), of,
                             bh_report_hours(x, -t->spare_hours));
    return bh_paper_text(&x->w, "%s h %s: %s h to spare", bh_report_hours(x, t->available_hours),
                         of, bh_report_hours(x, t->spare_hours));
}

static const char *precision(bh_reporting *x)
{
    const char *stat = range(x, BH_COL_STATISTICAL), *syst = range(x, BH_COL_SYSTEMATIC);
    return bh_paper_text(&x->w, "%s%s%s%s%s", stat, stat[0] ? " statistical" : "",
                         stat[0] && syst[0] ? "; " : "", syst, syst[0] ? " systematic" : "");
}

/* --- what limits it --- */

static void longest(bh_reporting *x, bh_text *t)
{
    size_t most = 0;
    double sum = 0.0;
    for (size_t s = 0; s < x->plan->setting_count; s++) {
        sum += x->hours[s].full + x->hours[s].empty;
        if (x->hours[s].full + x->hours[s].empty > x->hours[most].full + x->hours[most].empty)
            most = s;
    }
    const double hours = x->hours[most].full + x->hours[most].empty;
    if (!(hours > 0.0))
        return;
    bh_text_appendf(t, "Setting %s takes %s h, %s %% of the hours on target. ",
                    x->plan->settings[most].name, bh_report_hours(x, hours),
                    bh_report_percent(x, hours / sum));
    if (x->totals->change_hours > sum)
        bh_text_appendf(t, "Start-up and changes take longer than the data: %s h. ",
                        bh_report_hours(x, x->totals->change_hours));
}

static void readout(bh_reporting *x, bh_text *t)
{
    size_t worst = 0;
    double least = 1.0;
    for (size_t i = 0; i < x->view.row_count; i++) {
        const double live = bh_selection_number(&x->view, i, BH_COL_LIVE);
        if (live < least) {
            least = live;
            worst = i;
        }
    }
    if (least < 0.95)
        bh_text_appendf(t, "The readout records %s %% of the events in %s. ",
                        bh_report_percent(x, least), bh_report_row_name(x, worst));
}

/* [1] of a kind of cause, on the row where it does most. */
static double most_of(const bh_reporting *x, bh_cause_kind kind)
{
    double most = 0.0;
    for (size_t i = 0; i < x->view.row_count; i++) {
        const bh_effects e = bh_table_effects(x->table, false, x->view.rows[i]);
        most = fmax(most, bh_effects_of(bh_table_causes(x->table), &e, kind));
    }
    return most;
}

static const char *largest_cause(const bh_reporting *x)
{
    double most = 0.0;
    const char *words = "";
    for (int k = 0; k < BH_CAUSE_DEAD_TIME; k++) {
        const double size = most_of(x, (bh_cause_kind)k);
        if (size > most) {
            most = size;
            words = bh_cause_words((bh_cause_kind)k);
        }
    }
    return words;
}

static void larger(bh_reporting *x, bh_text *t)
{
    size_t count = 0;
    const char *cause = largest_cause(x);
    for (size_t i = 0; i < x->view.row_count; i++)
        count += bh_selection_number(&x->view, i, BH_COL_SYSTEMATIC) >
                 bh_selection_number(&x->view, i, BH_COL_STATISTICAL);
    if (count)
        bh_text_appendf(t,
                        "The systematic uncertainty of the rate is larger than the statistical one "
                        "in %zu of %zu rows; its largest cause: %s. ",
                        count, x->view.row_count, cause);
    else
        bh_text_append(t, "Counting statistics are the largest uncertainty in every row. ");
}

static const char *limits(bh_reporting *x)
{
    bh_text t = {0};
    longest(x, &t);
    readout(x, &t);
    larger(x, &t);
    if (t.length)
        t.bytes[--t.length] = '\0';
    return bh_paper_keep(&x->w, &t);
}

static const char *trimmed(bh_reporting *x, const char *text)
{
    size_t n = strlen(text);
    while (n > 0 && strchr(" \n", text[n - 1]))
        n--;
    return bh_paper_text(&x->w, "%.*s", (int)n, text);
}

void bh_report_summary(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"what", "", false}, {"answer", "", false}};
    bh_text t = {0};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Summary");
    if (x->plan->notes.text)
        bh_paper_add(&x->w, BH_BLOCK_WORDS, trimmed(x, x->plan->notes.text));
    bh_paper_table_open(&x->w, "What is asked for, and what for", columns, 2);
    fact(x, "measured", measured(x));
    bh_say_beam(x->plan, &t);
    fact(x, "beam", bh_paper_keep(&x->w, &t));
    for (size_t i = 0; i < x->plan->target_count; i++) {
        bh_say_target(&x->plan->targets[i], &t);
        fact(x, "target", bh_paper_keep(&x->w, &t));
    }
    for (size_t i = 0; i < x->plan->arm_count; i++) {
        const char *name = x->plan->arms[i].name.text;
        bh_say_arm(&x->plan->arms[i], &t);
        for (size_t k = name ? strlen(name) : 0; k < t.length; k++)
            if (t.bytes[k] == '_') /* of a key: "in_plane" */
                t.bytes[k] = ' ';
        fact(x, "arm", bh_paper_keep(&x->w, &t));
    }
    fact(x, "goals", wishes(x));
    fact(x, "asked", asked(x));
    fact(x, "available", available(x));
    fact(x, "uncertainty", precision(x));
    fact(x, "what limits it", limits(x));
    bh_paper_table_close(&x->w);
}
