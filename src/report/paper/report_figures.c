/* report_figures.c - the cross section and the signal rate against the angle, the settings drawn,
 * for the first arms of the plan. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/report/curve_figure.h"
#include "beamhours/report/reporting.h"

enum {
    RATE_POINTS = 61,
    SECTION_POINTS = 121,
    WITH = sizeof "with " - 1,
    OTHERS = sizeof "with  instead" - 1 /* all but the name */
};

static const bh_setting *setting_of(const bh_reporting *x, size_t row)
{
    return &x->plan->settings[bh_table_place(x->table, false, row).setting];
}

static const bh_setting_arm *arm_of(const bh_reporting *x, size_t row)
{
    return &setting_of(x, row)->arms[bh_table_place(x->table, false, row).arm];
}

/* Whether both have the same beam particle, target and arm. */
static bool alike(const bh_reporting *x, size_t a, size_t b)
{
    const bh_setting *s = setting_of(x, a), *t = setting_of(x, b);
    return s->target == t->target && strcmp(s->beam.particle.name, t->beam.particle.name) == 0 &&
           strcmp(arm_of(x, a)->arm.name.text, arm_of(x, b)->arm.name.text) == 0;
}

/* Models are laid over each other once: their spread goes with Q2 more than with energy. */
static bool first_of_its_kind(const bh_reporting *x, size_t row)
{
    for (size_t i = 0; i < row; i++)
        if (alike(x, row, i))
            return false;
    return true;
}

/* Whether an earlier row has the same curves. */
static bool drawn_already(const bh_reporting *x, size_t row)
{
    const double energy = setting_of(x, row)->beam.kinetic_energy.value;
    for (size_t i = 0; i < row; i++)
        if (alike(x, row, i) &&
            !(fabs(setting_of(x, i)->beam.kinetic_energy.value - energy) > 1e-9 * energy))
            return true;
    return false;
}

/* One column drawn, or the reason why it is not. */
static bh_code one(bh_reporting *x, const bh_curves *curves, const char *const *names, int shown,
                   bh_error *err)
{
    bh_figure *figure = bh_arena_take(x->w.arena, 1, sizeof *figure);
    const bh_curve_picture picture = {.table = x->table,
                                      .curves = curves,
                                      .shown = shown,
                                      .version = x->request->version,
                                      .names = names};
    bh_error why = {.code = BH_OK};
    if (!figure)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    const bh_code bad = bh_curve_figure(&picture, x->w.arena, figure, &why);
    if (bad == BH_ENOMEM)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (bad)
        bh_paper_add(&x->w, BH_BLOCK_WORDS, bh_paper_text(&x->w, "No figure: %s.", why.text));
    else
        bh_paper_figure(&x->w,
                        bh_paper_text(&x->w,
                                      "The %s against the %s; setting %s and those that share its "
                                      "beam energy, target and arm %s%s",
                                      bh_shown_words(shown), figure->x.words, curves->setting->name,
                                      curves->arm->arm.name.text,
                                      figure->below
                                          ? "; models over each other, each as far as its data "
                                            "reach, and their ratio to the one in use"
                                          : ""),
                        figure);
    return BH_OK;
}

/* --- models --- */

/* The model in use first, then those that the budget compares with it. */
struct models {
    size_t count;
    const char *name[BH_MOST_CURVES];
    const char *legend[BH_MOST_CURVES]; /* "kelly-2004 [4]" */
};

static void add_model(bh_reporting *x, struct models *m, const char *name, const char *source)
{
    if (m->count == BH_MOST_CURVES)
        return;
    m->name[m->count] = name;
    m->legend[m->count++] =
        bh_paper_text(&x->w, "%s [%d]", name, bh_paper_cite(&x->w, source ? source : name));
}

/* [1] what the choice of form factors does to a row: nothing where they are not in doubt. */
static double doubt(const bh_reporting *x, size_t row)
{
    const bh_effects e = bh_table_effects(x->table, false, x->view.rows[row]);
    return bh_effects_of(bh_table_causes(x->table), &e, BH_CAUSE_STRUCTURE);
}

/* From what is told of a row like this one. */
static void find_models(bh_reporting *x, size_t row, struct models *m)
{
    size_t told = 0;
    while (told < x->told_count && !alike(x, x->told_row[told], row))
        told++;
    const bh_explanation *e = told < x->told_count ? x->told[told] : NULL;
    const bool compared = doubt(x, row) > 0.0;
    for (size_t i = 0; e && i < bh_explanation_lines(e); i++) {
        const bh_line *l = bh_explanation_line(e, i);
        int end = 0;
        if (l->kind == BH_LINE_MODEL && m->count == 0 && strcmp(l->name, "structure model") == 0)
            add_model(x, m, bh_paper_text(&x->w, "%s", l->value), l->source);
        else if (compared && m->count > 0 && l->name &&
                 sscanf(l->name, "with %*s instead%n", &end) == 0 && end > 0)
            add_model(x, m, bh_paper_text(&x->w, "%.*s", end - OTHERS, l->name + WITH), l->source);
    }
}

static const char *list_of(bh_reporting *x, const struct models *m)
{
    bh_text list = {0};
    for (size_t i = 0; i < m->count; i++)
        bh_text_appendf(&list, "%s%s", i ? "," : "", m->name[i]);
    return bh_paper_keep(&x->w, &list);
}

/* --- curves --- */

static bh_curves_request request_of(const bh_reporting *x, size_t row)
{
    return (bh_curves_request){.setting = setting_of(x, row)->name,
                               .arm = arm_of(x, row)->arm.name.text,
                               .against = BH_AGAINST_ANGLE};
}

/* The cross section, finely, by all models or the one in use; the rate by the one in use. */
static bh_code curves_of(bh_reporting *x, size_t row, bh_curves *section, bh_curves *rate,
                         bh_error *err)
{
    struct models m = {.count = 0};
    bh_curves_request request = request_of(x, row);
    bh_error why = {.code = BH_OK};
    request.points = RATE_POINTS;
    bh_code bad = bh_curves_make(x->plan, &request, rate, &why);
    find_models(x, row, &m);
    const char *const *names = m.count ? m.legend : NULL;
    request.points = SECTION_POINTS;
    request.centre = true;
    request.structures = first_of_its_kind(x, row) && m.count > 1 ? list_of(x, &m) : NULL;
    if (!bad && bh_curves_make(x->plan, &request, section, NULL)) {
        request.structures = NULL;
        bad = bh_curves_make(x->plan, &request, section, &why);
    }
    if (bad == BH_ENOMEM)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (bad) {
        bh_paper_add(&x->w, BH_BLOCK_WORDS, bh_paper_text(&x->w, "No figure: %s.", why.text));
        return BH_OK;
    }
    bad = one(x, section, names, BH_COL_POINT_CROSS_SECTION, err);
    return bad ? bad : one(x, rate, names, BH_COL_SIGNAL, err);
}

bh_code bh_report_figures(bh_reporting *x, bh_error *err)
{
    size_t made = 0, left = 0;
    bh_code bad = BH_OK;
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Figures");
    for (size_t row = 0; !bad && row < x->view.row_count; row++) {
        if (arm_of(x, row)->first || drawn_already(x, row))
            continue;
        if (made == BH_MOST_REPORT_CURVES) {
            left++;
            continue;
        }
        bh_progress_tell(x->request->progress, "figures", made, BH_MOST_REPORT_CURVES);
        bad = curves_of(x, row, &x->report->curves[made], &x->report->models[made], err);
        made++;
    }
    if (left)
        bh_paper_add(&x->w, BH_BLOCK_WORDS,
                     bh_paper_text(&x->w,
                                   "Not drawn: %zu more of beam particle, energy, target and arm; "
                                   "\"beamhours curve\" draws each.",
                                   left));
    return bad;
}
