/* report_rows.c - the sections that are the run table's own columns, and the backgrounds. */
#include <math.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/report/prefix.h"
#include "beamhours/report/reporting.h"

#define COUNT(list) (sizeof(list) / sizeof(list)[0])

/* Whether a column of an angle repeats that of the arm in every row. */
static bool says_the_angle(const bh_reporting *x, int column)
{
    if (column != BH_COL_SCATTERED_ANGLE && column != BH_COL_RECOIL_ANGLE)
        return false;
    for (size_t r = 0; r < x->view.row_count; r++) {
        const double angle = bh_selection_number(&x->view, r, BH_COL_ANGLE),
                     other = bh_selection_number(&x->view, r, column);
        if (isnan(angle) != isnan(other) || fabs(angle - other) > 1e-9 * fabs(angle))
            return false;
    }
    return true;
}

void bh_report_kinematics(bh_reporting *x)
{
    static const int columns[] = {BH_COL_SETTING,
                                  BH_COL_ARM,
                                  BH_COL_PARTICLE,
                                  BH_COL_TARGET,
                                  BH_COL_BEAM_KINETIC,
                                  BH_COL_ANGLE,
                                  BH_COL_SCATTERED_ANGLE,
                                  BH_COL_SCATTERED_KINETIC,
                                  BH_COL_SCATTERED_MOMENTUM,
                                  BH_COL_RECOIL_KINETIC,
                                  BH_COL_RECOIL_ANGLE,
                                  BH_COL_CENTRAL_MOMENTUM,
                                  BH_COL_Q2,
                                  BH_COL_Q,
                                  BH_COL_EPSILON};
    int shown[COUNT(columns)];
    size_t n = 0;
    for (size_t c = 0; c < COUNT(columns); c++)
        if (!says_the_angle(x, columns[c]))
            shown[n++] = columns[c];
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Kinematics");
    bh_report_rows(x,
                   "Kinematics of each setting: laboratory angles; energy: kinetic, entering the "
                   "target; angle: of the arm, thus of the particle it detects; T', p': of the "
                   "scattered particle at the vertex; T recoil and recoil: of the struck nucleus; "
                   "central: momentum the arm is set to; Q2 positive; epsilon: virtual-photon "
                   "polarisation",
                   shown, n);
}

/* What each bin counts; a ring is little without it. */
static void bins(bh_reporting *x)
{
    enum { MOST_BINS = 300 };
    static const int columns[] = {BH_COL_SETTING, BH_COL_ARM,         BH_COL_BIN,
                                  BH_COL_ANGLE,   BH_COL_Q2,          BH_COL_CROSS_SECTION,
                                  BH_COL_SIGNAL,  BH_COL_BACKGROUND,  BH_COL_SOLID_ANGLE,
                                  BH_COL_COUNTS,  BH_COL_STATISTICAL, BH_COL_SYSTEMATIC};
    if (x->bins.row_count > MOST_BINS) {
        bh_paper_add(&x->w, BH_BLOCK_WORDS,
                     bh_paper_text(&x->w,
                                   "There are %zu bins: \"beamhours table --bins\" lists them.",
                                   x->bins.row_count));
        return;
    }
    bh_report_rows_of(x, &x->bins,
                      "Bins of the acceptance, in the hours of their setting: angle and Q2: means "
                      "over the bin; stat and syst: relative, of the background-subtracted signal",
                      columns, COUNT(columns));
}

void bh_report_rates(bh_reporting *x)
{
    static const int sections[] = {
        BH_COL_SETTING,       BH_COL_ARM,         BH_COL_POINT_CROSS_SECTION,
        BH_COL_CROSS_SECTION, BH_COL_SOLID_ANGLE, BH_COL_BEAM,
        BH_COL_SEEN,          BH_COL_LUMINOSITY};
    static const int rates[] = {
        BH_COL_SETTING, BH_COL_ARM,        BH_COL_RADIATIVE, BH_COL_KEPT,   BH_COL_EFFICIENCY,
        BH_COL_SIGNAL,  BH_COL_BACKGROUND, BH_COL_LIVE,      BH_COL_COUNTS, BH_COL_STATISTICAL};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Rates");
    bh_paper_add(
        &x->w, BH_BLOCK_WORDS,
        "Signal rate = luminosity x mean cross section x solid angle x radiative factor x "
        "kept share x efficiency, before dead time. Cross sections, nuclei and "
        "luminosities are per nucleus of the scatterer, in the laboratory. Counts = signal "
        "rate x live fraction x 3600 s/h x hours. Statistical uncertainty = sqrt((s + w + "
        "o) T + w T / phi) / (s T), with the recorded rates s of the signal, w of windows "
        "(measured with the empty target) and o of all other background, T seconds on the "
        "full target, and phi hours of empty target for one of full target.");
    bh_report_rows(
        x,
        "Cross sections per nucleus (at angle: at the arm's centre; sigma: mean over "
        "acceptance and depth), solid angle, beam particles of the named kind, scatterer "
        "nuclei seen, luminosity per nucleus",
        sections, COUNT(sections));
    bh_report_rows(x,
                   "Factors and rates: radiative: share left by radiation inside the cut; kept: "
                   "share inside momentum bite and resolution; eff: efficiency; bkg: all "
                   "background, before dead time; live: share recorded after dead time, prescale "
                   "and rate limit; counts: signal recorded; stat: relative, of the "
                   "background-subtracted signal",
                   rates, COUNT(rates));
    bins(x);
}

enum { MOST_SHARES = 64 };

/* A line of the background, and whether it is the sum of them. */
struct share {
    const char *name;
    double rate; /* [Hz] */
    const char *source;
    bool is_sum;
};

static bool in_background(const char *section)
{
    return strcmp(section, "Background") == 0;
}

/* "quasi-elastic" of "quasi-elastic on 27Al in layer 1", "elastic" of "pion-: elastic on 1H": lines
 * of one kind have one source, which the first of them says. */
static size_t kind_of(const char **name)
{
    const char *by = strstr(*name, ": ");
    *name = by ? by + 2 : *name;
    const char *on = strstr(*name, " on ");
    return on ? (size_t)(on - *name) : strlen(*name);
}

static const char *source_of(const bh_explanation *e, size_t line)
{
    const char *name = bh_explanation_line(e, line)->name;
    const size_t n = kind_of(&name);
    for (size_t i = line + 1; i-- > 0;) {
        const bh_line *l = bh_explanation_line(e, i);
        const char *other = l->name;
        if (l->kind == BH_LINE_SECTION)
            break;
        if (l->source && kind_of(&other) == n && strncmp(other, name, n) == 0)
            return l->source;
    }
    return NULL;
}

/* The i-th line of an explanation, where it is a rate of background. */
static bool is_share(const bh_explanation *e, size_t i, struct share *out)
{
    const bh_line *l = bh_explanation_line(e, i);
    const char *unit = NULL;
    if (l->kind != BH_LINE_FACTOR || !l->value || bh_number_parse(l->value, &unit, &out->rate) ||
        strcmp(unit, " Hz") != 0)
        return false;
    out->name = l->name;
    out->source = source_of(e, i);
    out->is_sum = strcmp(l->name, "background rate") == 0;
    return true;
}

static void share(bh_reporting *x, size_t row, const struct share *of)
{
    bh_paper_cell(&x->w, bh_report_row_name(x, row));
    bh_paper_cell(&x->w, bh_paper_text(&x->w, "%s", of->name));
    bh_paper_cell(&x->w, bh_report_number(x, of->rate, 4));
    bh_paper_cell(&x->w,
                  of->source ? bh_paper_text(&x->w, "[%d]", bh_paper_cite(&x->w, of->source)) : "");
}

static double background_of(const bh_explanation *e)
{
    struct share s;
    for (size_t i = 0; i < bh_explanation_lines(e); i++)
        if (is_share(e, i, &s) && s.is_sum)
            return s.rate;
    return 0.0;
}

/* The shares of one row, found in its explanation. */
struct shares {
    size_t count;
    double all, said; /* [Hz] their sum as the table has it; of those kept */
    struct share list[MOST_SHARES];
};

/* Keeps each share that shows in the digits of the sum, the largest first. */
static void keep(struct shares *all, const struct share *s)
{
    size_t at = all->count;
    if (s->rate < 1e-3 * all->all || all->count == MOST_SHARES)
        return;
    while (at > 0 && all->list[at - 1].rate < s->rate) {
        all->list[at] = all->list[at - 1];
        at--;
    }
    all->list[at] = *s;
    all->count++;
    all->said += s->rate;
}

/* Each of them, what the others give together, and the sum; nothing where nothing is counted. */
static void items(bh_reporting *x, size_t row, const bh_explanation *e)
{
    struct shares all = {.all = background_of(e)};
    struct share sum = {.name = "background rate", .rate = all.all};
    bool inside = false;
    for (size_t i = 0; all.all > 0.0 && i < bh_explanation_lines(e); i++) {
        const bh_line *l = bh_explanation_line(e, i);
        struct share s;
        if (l->kind == BH_LINE_SECTION)
            inside = in_background(l->name);
        if (inside && is_share(e, i, &s) && !s.is_sum)
            keep(&all, &s);
    }
    for (size_t i = 0; i < all.count; i++)
        share(x, row, &all.list[i]);
    if (fabs(all.all - all.said) > 5e-4 * all.all)
        share(x, row, &(struct share){.name = "all else together", .rate = all.all - all.said});
    if (all.all > 0.0)
        share(x, row, &sum);
}

/* Of rows that are not told elsewhere the explanation is made, read and forgotten. */
static bh_code items_of(bh_reporting *x, size_t row, bh_error *err)
{
    for (size_t i = 0; i < x->told_count; i++)
        if (x->told_row[i] == row) {
            items(x, row, x->told[i]);
            return BH_OK;
        }
    if (!(bh_selection_number(&x->view, row, BH_COL_BACKGROUND) > 0.0))
        return BH_OK;
    bh_explanation *e = bh_report_explain(x, row, err);
    if (!e)
        return err->code;
    items(x, row, e);
    bh_explanation_free(e);
    return BH_OK;
}

bh_code bh_report_backgrounds(bh_reporting *x, bh_error *err)
{
    static const bh_paper_column columns[] = {
        {"setting", "", false}, {"from", "", false}, {"rate", "Hz", true}, {"source", "", false}};
    bool any = false;
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Backgrounds");
    for (size_t row = 0; row < x->view.row_count; row++)
        any |= bh_selection_number(&x->view, row, BH_COL_BACKGROUND) > 0.0;
    if (!any)
        bh_paper_add(&x->w, BH_BLOCK_WORDS,
                     "No arm counts anything beside its signal, of what is computed here: see what "
                     "is assumed.");
    bh_paper_table_open(&x->w,
                        "What each arm counts beside the signal, before dead time, largest first; "
                        "the last of a setting is the sum, in which depths are averaged: it may "
                        "differ in its last digit",
                        columns, COUNT(columns));
    bh_code bad = BH_OK;
    for (size_t row = 0; !bad && row < x->view.row_count; row++) {
        bh_progress_tell(x->request->progress, "backgrounds", row, x->view.row_count);
        bad = items_of(x, row, err);
    }
    bh_paper_table_close(&x->w);
    return bad;
}

void bh_report_sensitivities(bh_reporting *x)
{
    static const int columns[] = {BH_COL_SETTING, BH_COL_ARM, BH_COL_ANGLE, BH_COL_PER_MRAD,
                                  BH_COL_PER_PERMILLE};
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Sensitivities");
    bh_report_rows(x,
                   "Relative change of the signal rate for +1 mrad of the arm's angle, and for "
                   "+0.1 % of beam momentum with the arm fixed",
                   columns, COUNT(columns));
}
