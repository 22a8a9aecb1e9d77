/* report_uncertainty.c - the budget, row by row, and every cause once. */
#include <math.h>
#include <string.h>

#include "beamhours/report/reporting.h"
#include "beamhours/units/nuclide.h"

enum { FIXED = 4 };

static bh_effects effects_of(const bh_reporting *x, size_t row)
{
    return bh_table_effects(x->table, false, x->view.rows[row]);
}

/* Whether a kind of cause acts on any row. */
static bool acts(const bh_reporting *x, bh_cause_kind kind)
{
    for (size_t r = 0; r < x->view.row_count; r++) {
        const bh_effects e = effects_of(x, r);
        if (bh_effects_of(bh_table_causes(x->table), &e, kind) > 0.0)
            return true;
    }
    return false;
}

static void budget(bh_reporting *x)
{
    const bh_causes *causes = bh_table_causes(x->table);
    bh_paper_column columns[BH_CAUSE_KINDS + FIXED];
    bh_cause_kind kinds[BH_CAUSE_KINDS];
    size_t n = 0, k = 0;
    columns[n++] = (bh_paper_column){"setting", "", false};
    for (int i = 0; i < BH_CAUSE_KINDS; i++)
        if (acts(x, (bh_cause_kind)i)) {
            kinds[k++] = (bh_cause_kind)i;
            columns[n++] = (bh_paper_column){bh_cause_source((bh_cause_kind)i), "%", true};
        }
    columns[n++] = (bh_paper_column){"syst", "%", true};
    columns[n++] = (bh_paper_column){"stat", "%", true};
    columns[n++] = (bh_paper_column){"together", "%", true};
    bh_paper_table_open(&x->w,
                        "Relative standard uncertainties of the signal rate by cause; syst: these "
                        "in quadrature, what acts on counts alone not among them; together: with "
                        "the statistical one in quadrature",
                        columns, n);
    for (size_t r = 0; r < x->view.row_count; r++) {
        const bh_effects e = effects_of(x, r);
        const double syst = bh_selection_number(&x->view, r, BH_COL_SYSTEMATIC);
        const double stat = bh_selection_number(&x->view, r, BH_COL_STATISTICAL);
        bh_paper_cell(&x->w, bh_report_row_name(x, r));
        for (size_t i = 0; i < k; i++)
            bh_paper_cell(&x->w, bh_report_percent(x, bh_effects_of(causes, &e, kinds[i])));
        bh_paper_cell(&x->w, bh_report_percent(x, syst));
        bh_paper_cell(&x->w, bh_report_percent(x, stat));
        bh_paper_cell(&x->w, bh_report_percent(x, hypot(syst, stat)));
    }
    bh_paper_table_close(&x->w);
}

/* "beam.current", "models.structure: 1H", "models.structure: 1H by kelly-2004". */
static const char *what(bh_reporting *x, const bh_cause *c)
{
    char nuclide[8];
    const char *element = c->z == 0 ? "" : bh_element_symbol(c->z);
    const char *name = c->a == 0 ? element : bh_nuclide_name(c->z, c->a, nuclide);
    return bh_paper_text(&x->w, "%s%s%s%s%s", c->key ? c->key : "", name[0] ? ": " : "", name,
                         c->model ? " by " : "", c->model ? c->model : "");
}

static void cause(bh_reporting *x, unsigned number)
{
    const bh_cause *c = bh_causes_at(bh_table_causes(x->table), number);
    double largest = 0.0;
    size_t where = 0;
    for (size_t r = 0; r < x->view.row_count; r++) {
        const bh_effects e = effects_of(x, r);
        for (size_t i = 0; i < e.count; i++)
            if (e.cause[i] == number && fabs(e.effect[i]) > fabs(largest)) {
                largest = e.effect[i];
                where = r;
            }
    }
    if (!(fabs(largest) > 0.0))
        return;
    bh_paper_cell(&x->w, bh_cause_words(c->kind));
    bh_paper_cell(&x->w, what(x, c));
    bh_paper_cell(&x->w, bh_report_percent(x, largest));
    bh_paper_cell(&x->w, bh_report_row_name(x, where));
}

void bh_report_uncertainty(bh_reporting *x)
{
    static const bh_paper_column columns[] = {{"cause", "", false},
                                              {"value or model", "", false},
                                              {"largest effect", "%", true},
                                              {"in", "", false}};
    const size_t count = bh_causes_count(bh_table_causes(x->table));
    bh_paper_add(&x->w, BH_BLOCK_SECTION, "Uncertainties");
    bh_paper_add(
        &x->w, BH_BLOCK_WORDS,
        "Systematic uncertainties are those that the plan writes behind its values, and "
        "those of the models; a value without one counts as exact. Another description of "
        "a nucleus shows the whole change that it would make; the budget has half the "
        "range of all of them. What the radiative correction is uncertain by stands with its "
        "model, and is not in these sums.");
    budget(x);
    bh_paper_table_open(&x->w,
                        "Every cause once, with the largest change of a signal rate for one "
                        "standard uncertainty up, or with the other model",
                        columns, 4);
    for (unsigned i = 0; i < count; i++)
        cause(x, i);
    bh_paper_table_close(&x->w);
}
