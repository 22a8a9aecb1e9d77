/* report_figures.c - the cross section and the signal rate against the angle, the settings drawn,
 * for the first arms of the plan. */
#include <string.h>

#include "beamhours/report/curve_figure.h"
#include "beamhours/report/reporting.h"

enum { POINTS = 61 };

/* Whether the i-th told row would give the same curves as one before it. */
static bool drawn_already(const bh_reporting *x, size_t told)
{
    const bh_place p = bh_table_place(x->table, false, x->told_row[told]);
    const bh_setting *s = &x->plan->settings[p.setting];
    for (size_t i = 0; i < told; i++) {
        const bh_place q = bh_table_place(x->table, false, x->told_row[i]);
        const bh_setting *t = &x->plan->settings[q.setting];
        if (s->target == t->target && strcmp(s->beam.particle.name, t->beam.particle.name) == 0 &&
            strcmp(s->arms[p.arm].arm.name.text, t->arms[q.arm].arm.name.text) == 0)
            return true;
    }
    return false;
}

static bh_code one(bh_reporting *x, const bh_curves *curves, int shown, bh_error *err)
{
    bh_figure *figure = bh_arena_take(x->w.arena, 1, sizeof *figure);
    const bh_curve_picture picture = {
        .table = x->table, .curves = curves, .shown = shown, .version = x->request->version};
    bh_error why = {.code = BH_OK};
    if (!figure)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    const bh_code bad = bh_curve_figure(&picture, x->w.arena, figure, &why);
    if (bad == BH_ENOMEM)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (bad) /* nothing to draw, and the reason */
        bh_paper_add(&x->w, BH_BLOCK_WORDS, bh_paper_text(&x->w, "No figure: %s.", why.text));
    else
        bh_paper_figure(&x->w,
                        bh_paper_text(&x->w,
                                      "%s against %s; setting %s and those that share its "
                                      "beam energy, target and arm %s",
                                      bh_shown_words(shown), figure->x.words, curves->setting->name,
                                      curves->arm->arm.name.text),
                        figure);
    return BH_OK;
}

static bh_code curves_of(bh_reporting *x, size_t told, bh_curves *curves, bh_error *err)
{
    const bh_place p = bh_table_place(x->table, false, x->told_row[told]);
    const bh_setting *s = &x->plan->settings[p.setting];
    const bh_curves_request request = {.setting = s->name,
                                       .arm = s->arms[p.arm].arm.name.text,
                                       .against = BH_AGAINST_ANGLE,
                                       .points = POINTS,
                                       .bins_do = true};
    bh_error why = {.code = BH_OK};
    const bh_code bad = bh_curves_make(x->plan, &request, curves, &why);
    if (bad == BH_ENOMEM)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    if (bad) {
        bh_paper_add(&x->w, BH_BLOCK_WORDS, bh_paper_text(&x->w, "No figure: %s.", why.text));
        return BH_OK;
    }
    const bh_code worse = one(x, curves, BH_COL_POINT_CROSS_SECTION, err);
    return worse ? worse : one(x, curves, BH_COL_SIGNAL, err);
}

bh_code bh_report_figures(bh_reporting *x, bh_error *err)
{
    size_t made = 0;
    bh_code bad = BH_OK;
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Figures");
    for (size_t t = 0; !bad && t < x->told_count && made < BH_MOST_REPORT_CURVES; t++) {
        const bh_place p = bh_table_place(x->table, false, x->told_row[t]);
        const bool pair = x->plan->settings[p.setting].arms[p.arm].first != NULL;
        if (!pair && !drawn_already(x, t))
            bad = curves_of(x, t, &x->report->curves[made++], err);
    }
    return bad;
}
