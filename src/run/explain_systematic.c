/* explain_systematic.c - what a rate is uncertain by, cause by cause, and its ratio to others. */
#include <math.h>

#include "beamhours/run/explaining.h"
#include "beamhours/units/nuclide.h"

/* The row that is explained. */
struct row {
    const bh_causes *causes;
    const bh_effects *parts; /* of the whole arm and its bins */
    const bh_effects *own;
    double total; /* [1] */
};

static void factor(bh_explaining *x, const char *name, const char *value, const char *formula)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR, .name = name, .value = value, .formula = formula});
}

static const char *source_of(bh_explaining *x, const bh_cause *c)
{
    return c->at.line > 0 ? bh_explain_mark(x, c->at) : NULL;
}

/* "target.layers.2.thickness", "models.structure: 1H". */
static const char *where(bh_explaining *x, const bh_cause *c)
{
    char nuclide[8];
    if (c->z == 0 && c->a == 0)
        return bh_explain_text(x, "%s", c->key);
    if (c->a == 0)
        return bh_explain_text(x, "%s: %s", c->key, bh_element_symbol(c->z));
    return bh_explain_text(x, "%s: %s", c->key, bh_nuclide_name(c->z, c->a, nuclide));
}

static const char *share_of(bh_explaining *x, const struct row *row, double effect)
{
    return bh_explain_text(
        x, "%s of the variance",
        bh_explain_percent(x, row->total > 0 ? effect * effect / (row->total * row->total) : 0));
}

static void explain_cause(bh_explaining *x, const struct row *row, const bh_cause *c, double effect)
{
    bh_explain_add(
        x, (bh_line){.kind = BH_LINE_FACTOR,
                     .name = bh_explain_text(x, "from %s", bh_cause_source(c->kind)),
                     .value = bh_explain_percent(x, effect),
                     .formula = bh_explain_text(x, "%s; %s", where(x, c), bh_cause_words(c->kind)),
                     .source = source_of(x, c),
                     .remark = bh_cause_on_counts(c->kind) ? "of the counts; not in the total"
                                                           : share_of(x, row, effect)});
}

static bool same_nuclide(const bh_cause *a, const bh_cause *b)
{
    return a->kind == b->kind && a->z == b->z && a->a == b->a;
}

/* All that is known of the form factors of one nuclide, its causes from number `first` on. */
static void explain_structure(bh_explaining *x, const struct row *row, size_t first)
{
    const bh_cause *c = bh_causes_at(row->causes, row->own->cause[first]);
    size_t count = 1, others = 0;
    while (first + count < row->own->count &&
           same_nuclide(c, bh_causes_at(row->causes, row->own->cause[first + count])))
        count++;
    for (size_t i = 0; i < count; i++)
        others += bh_causes_at(row->causes, row->own->cause[first + i])->model &&
                  !isnan(row->own->effect[first + i]);
    const bh_effects all = {count, row->own->cause + first, row->own->effect + first};
    const double size = bh_effects_of(row->causes, &all, BH_CAUSE_STRUCTURE);
    const char *how =
        others ? bh_explain_text(x,
                                 "half the range over the model in use and %zu other%s, in "
                                 "quadrature with the data behind it",
                                 others, others > 1 ? "s" : "")
               : "as published with the fit or the data behind it";
    bh_explain_add(x, (bh_line){.kind = BH_LINE_FACTOR,
                                .name = "from structure",
                                .value = bh_explain_percent(x, size),
                                .formula = bh_explain_text(x, "%s; %s", where(x, c), how),
                                .source = source_of(x, c),
                                .remark = share_of(x, row, size)});
}

static void explain_causes(bh_explaining *x, const struct row *row)
{
    const bh_cause *last = NULL;
    for (size_t i = 0; i < row->own->count; i++) {
        const bh_cause *c = bh_causes_at(row->causes, row->own->cause[i]);
        const bool again = last && c->kind == BH_CAUSE_STRUCTURE && same_nuclide(last, c);
        last = c;
        if (again)
            continue;
        if (c->kind == BH_CAUSE_STRUCTURE)
            explain_structure(x, row, i);
        else if (fabs(row->own->effect[i]) > 0)
            explain_cause(x, row, c, row->own->effect[i]);
    }
}

static void explain_largest(bh_explaining *x, const struct row *row)
{
    const double stat =
        bh_precision_uncertainty(&x->arm->recorded[x->bin], &x->arm->empty, x->hours.full);
    const char *name = stat > 0 ? "counting statistics" : NULL;
    double largest = stat > 0 ? stat : 0;
    for (int k = 0; k < BH_CAUSE_DEAD_TIME; k++) {
        const double size = bh_effects_of(row->causes, row->own, (bh_cause_kind)k);
        if (size > largest) {
            largest = size;
            name = bh_cause_source((bh_cause_kind)k);
        }
    }
    if (stat > 0 && isfinite(stat))
        factor(x, "with counting statistics", bh_explain_percent(x, hypot(row->total, stat)),
               bh_explain_text(x, "%s of statistics in quadrature", bh_explain_percent(x, stat)));
    if (name)
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE,
                                    .remark = bh_explain_text(x, "The largest is %s.", name)});
}

static void explain_ratio(bh_explaining *x, const struct row *row, const char *other,
                          const bh_effects *effects)
{
    const double ratio = bh_effects_of_ratio(row->causes, row->own, effects);
    const double apart = hypot(row->total, bh_effects_total(row->causes, effects));
    factor(x, bh_explain_text(x, "ratio to %s", other), bh_explain_percent(x, ratio),
           bh_explain_text(x, "what common causes leave of %s", bh_explain_percent(x, apart)));
}

static void explain_ratios_of_arms(bh_explaining *x, const struct row *row)
{
    int shown = 0;
    for (size_t i = 0; i < bh_table_rows(x->table, false) && shown < BH_EXPLAIN_RATIOS; i++) {
        const bh_place place = bh_table_place(x->table, false, i);
        const bh_setting *setting = &bh_table_plan(x->table)->settings[place.setting];
        const bh_setting_arm *arm = &setting->arms[place.arm];
        const bool rate = bh_table_number(x->table, false, i, BH_COL_SYSTEMATIC) >= 0;
        if (arm == x->arm->yield->view.arm || !rate)
            continue;
        const bh_effects effects = bh_table_effects(x->table, false, i);
        const char *name = setting->arm_count > 1
                               ? bh_explain_text(x, "%s, arm %s", setting->name, arm->arm.name.text)
                               : setting->name;
        explain_ratio(x, row, name, &effects);
        shown++;
    }
}

static void explain_ratios_of_bins(bh_explaining *x, const struct row *row)
{
    int shown = 0;
    for (int i = 1; i < x->arm->yield->view.parts && shown < BH_EXPLAIN_RATIOS; i++) {
        if (i == x->bin || !(x->arm->yield->part[i].signal > 0))
            continue;
        explain_ratio(x, row, bh_explain_text(x, "bin %d", i), &row->parts[i]);
        shown++;
    }
}

void bh_explain_systematic(bh_explaining *x)
{
    const size_t parts = x->bin ? (size_t)x->arm->yield->view.parts : 1;
    bh_effects *effects = bh_arena_take(x->arena, parts, sizeof *effects);
    bh_error ignored;
    bh_systematics *with = &x->evaluator.systematics;
    if (!effects || bh_systematic_arm(with, x->arm, parts, effects, &ignored)) {
        x->failed = true; /* it worked when the row was made */
        return;
    }
    bh_explain_section(x, "Systematic uncertainty");
    if (!(x->part->signal > 0))
        return;
    if (!bh_systematic_known(&x->arm->yield->view, x->reached ? x->event.q2 * 1e-6 : 0)) {
        bh_explain_add(x, (bh_line){.kind = BH_LINE_NOTE, .remark = bh_why_text(BH_WHY_NUCLEAR)});
        return;
    }
    struct row row = {.causes = with->causes, .parts = effects, .own = &effects[x->bin]};
    row.total = bh_effects_total(row.causes, row.own);
    explain_causes(x, &row);
    factor(x, "systematic uncertainty", bh_explain_percent(x, row.total),
           "these in quadrature, isotopes linearly; relative, of the signal rate");
    explain_largest(x, &row);
    bh_explain_section(x, "Systematic uncertainty of ratios of signal rates");
    if (x->bin)
        explain_ratios_of_bins(x, &row);
    else
        explain_ratios_of_arms(x, &row);
}
