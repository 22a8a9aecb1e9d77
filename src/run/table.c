/* table.c - the run table: rows, totals, cautions and warnings of an evaluated plan. */
#include "beamhours/run/table.h"

#include <stdlib.h>
#include <string.h>

#include "beamhours/base/arena.h"
#include "beamhours/run/conclude.h"
#include "beamhours/run/evaluate.h"
#include "beamhours/run/totals.h"
#include "beamhours/run/workspace.h"

enum { NOTES = 4 };

struct bh_table {
    const bh_plan *plan;
    bh_arena *arena;
    size_t count[2]; /* rows of arms, rows of bins */
    bh_row *rows[2];
    const bh_causes *causes;
    bh_conclusion end;
    const char *notes[NOTES];
};

/* Numbers the rows of bins of one arm; returns the next free row. */
static bh_row *lay_out_bins(bh_row *bin, size_t setting, size_t arm, int bins)
{
    for (int b = 1; bin && b <= bins; b++) {
        *bin = (bh_row){.setting = setting, .arm = arm, .bin = b};
        bin++;
    }
    return bin;
}

/* Numbers the rows: where each stands in the plan. */
static void lay_out(bh_table *table)
{
    bh_row *whole = table->rows[0], *bin = table->rows[1];
    for (size_t s = 0; s < table->plan->setting_count; s++) {
        const bh_setting *setting = &table->plan->settings[s];
        for (size_t a = 0; a < setting->arm_count; a++) {
            *whole = (bh_row){.setting = s, .arm = a};
            whole++;
            bin = lay_out_bins(bin, s, a, setting->arms[a].arm.bins);
        }
    }
}

static bool make_rows(bh_table *table, bool bins)
{
    for (size_t s = 0; s < table->plan->setting_count; s++) {
        const bh_setting *setting = &table->plan->settings[s];
        table->count[0] += setting->arm_count;
        for (size_t a = 0; bins && a < setting->arm_count; a++)
            table->count[1] += (size_t)setting->arms[a].arm.bins;
    }
    table->rows[0] = bh_arena_take(table->arena, table->count[0], sizeof(bh_row));
    table->rows[1] = bins ? bh_arena_take(table->arena, table->count[1], sizeof(bh_row)) : NULL;
    if (!table->rows[0] || (bins && !table->rows[1]))
        return false;
    lay_out(table);
    return true;
}

static size_t bins_of(const bh_setting *setting)
{
    size_t bins = 0;
    for (size_t a = 0; a < setting->arm_count; a++)
        bins += (size_t)setting->arms[a].arm.bins;
    return bins;
}

/* How many of the arms of a setting have a systematic uncertainty. */
static size_t rated(const bh_row *rows, size_t arms)
{
    size_t count = 0;
    for (size_t a = 0; a < arms; a++)
        count += rows[a].number[BH_COL_SYSTEMATIC] >= 0;
    return count;
}

/* Only as many settings as there is need of. */
static bh_code evaluate_few(bh_table *table, bh_evaluator *evaluator, size_t enough, bh_error *err)
{
    const bh_plan *plan = table->plan;
    bh_setting_rows out = {.whole = table->rows[0]};
    size_t found = 0;
    for (size_t s = 0; s < plan->setting_count && found < enough; s++) {
        const bh_code code = bh_setting_evaluate(evaluator, s, &out, err);
        if (code)
            return code;
        found += rated(out.whole, plan->settings[s].arm_count);
        out.whole += plan->settings[s].arm_count;
    }
    table->count[0] = (size_t)(out.whole - table->rows[0]);
    table->count[1] = 0;
    return BH_OK;
}

static bh_code evaluate(bh_table *table, bh_evaluator *evaluator, const bh_progress *progress,
                        bh_error *err)
{
    const bh_plan *plan = table->plan;
    bh_stretch *hours = bh_arena_take(table->arena, plan->setting_count + 1, sizeof *hours);
    if (!hours)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    bh_setting_rows out = {.whole = table->rows[0], .bins = table->rows[1]};
    for (size_t s = 0; s < plan->setting_count; s++) {
        const bh_code code = bh_setting_evaluate(evaluator, s, &out, err);
        if (code)
            return code;
        hours[s] = (bh_stretch){.full = out.full, .empty = out.empty};
        out.whole += plan->settings[s].arm_count;
        out.bins += out.bins ? bins_of(&plan->settings[s]) : 0;
        bh_progress_tell(progress, "settings", s + 1, plan->setting_count);
    }
    return bh_totals_from_plan(plan, hours, table->arena, &table->end.totals, err);
}

static void take_notes(bh_table *table)
{
    size_t n = 0;
    const char *radiation = table->plan->models.radiative.text;
    if (radiation && strcmp(radiation, "none") == 0)
        table->notes[n++] = "Radiation is switched off (models.radiative: none): radiative_factor "
                            "is 1 in every row.";
    const char *losses = table->plan->models.energy_loss.text;
    if (losses && strcmp(losses, "none") == 0)
        table->notes[n++] = "Energy loss is switched off (models.energy_loss: none): every "
                            "collision happens at the energy that enters the target.";
    for (size_t s = 0; s < table->plan->setting_count; s++)
        if (table->plan->settings[s].beam.particle.kind != BH_KIND_LEPTON) {
            table->notes[n] = "Hadron and ion beams scatter by their charge alone: nuclear forces "
                              "are not in these numbers.";
            return;
        }
}

static bh_code out_of_memory(bh_error *err)
{
    return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
}

/* All that is said about the plan and its numbers. */
static bh_code conclude(bh_table *table, const bh_remarks *remarks, const bh_diags *said,
                        bh_error *err)
{
    take_notes(table);
    return bh_conclude(table->plan, remarks, said, table->arena, &table->end) ? out_of_memory(err)
                                                                              : BH_OK;
}

static bh_code fill(bh_table *table, const bh_evaluation *how, const bh_diags *said, bh_error *err)
{
    bh_workspace *own = how->workspace ? NULL : bh_workspace_new();
    bh_remarks *remarks = bh_remarks_new();
    bh_evaluator evaluator = {.yielder = {.workspace = how->workspace ? how->workspace : own,
                                          .remarks = remarks,
                                          .cancelled = how->cancelled,
                                          .asker = how->asker,
                                          .without_changes = how->without_changes}};
    bh_code code = BH_OK;
    if (!evaluator.yielder.workspace || !remarks || !make_rows(table, how->bins))
        code = out_of_memory(err);
    if (!code)
        code = bh_evaluator_prepare(&evaluator, table->plan, table->arena, err);
    if (!code)
        code = how->enough ? evaluate_few(table, &evaluator, how->enough, err)
                           : evaluate(table, &evaluator, how->progress, err);
    table->causes = evaluator.systematics.causes;
    if (!code)
        code = conclude(table, remarks, said, err);
    bh_remarks_free(remarks);
    bh_workspace_free(own);
    return code;
}

bh_table *bh_table_new(const bh_plan *plan, const bh_evaluation *how, const bh_diags *said,
                       bh_error *err)
{
    bh_error why = {.code = BH_OK};
    bh_table *table = calloc(1, sizeof *table);
    if (table) {
        table->plan = plan;
        table->arena = bh_arena_new();
        table->end.warnings = bh_diags_new();
    }
    const bh_code code = table && table->arena && table->end.warnings ? fill(table, how, said, &why)
                                                                      : out_of_memory(&why);
    if (!code)
        return table;
    if (err)
        *err = why;
    bh_table_free(table);
    return NULL;
}

void bh_table_free(bh_table *table)
{
    if (!table)
        return;
    bh_diags_free(table->end.warnings);
    bh_arena_free(table->arena);
    free(table);
}

const bh_plan *bh_table_plan(const bh_table *table)
{
    return table->plan;
}

size_t bh_table_rows(const bh_table *table, bool bins)
{
    return table->count[bins];
}

double bh_table_number(const bh_table *table, bool bins, size_t row, bh_column_id column)
{
    return table->rows[bins][row].number[column];
}

const char *bh_table_text(const bh_table *table, bool bins, size_t row, bh_column_id column)
{
    const bh_row *r = &table->rows[bins][row];
    const bh_setting *setting = &table->plan->settings[r->setting];
    switch (column) {
    case BH_COL_SETTING:
        return setting->name;
    case BH_COL_ARM:
        return setting->arms[r->arm].arm.name.text;
    case BH_COL_PARTICLE:
        return setting->beam.particle.name;
    case BH_COL_TARGET:
        return setting->target->name.text;
    case BH_COL_SCATTERER:
        return setting->target->scatterer.text;
    default:
        return NULL;
    }
}

const char *bh_table_reason(const bh_table *table, bool bins, size_t row, bh_column_id column)
{
    return bh_why_text(table->rows[bins][row].why[column]);
}

bh_place bh_table_place(const bh_table *table, bool bins, size_t row)
{
    const bh_row *r = &table->rows[bins][row];
    return (bh_place){.setting = r->setting, .arm = r->arm, .bin = r->bin};
}

const bh_causes *bh_table_causes(const bh_table *table)
{
    return table->causes;
}

bh_effects bh_table_effects(const bh_table *table, bool bins, size_t row)
{
    return table->rows[bins][row].effects;
}

const char *bh_table_note(const bh_table *table, size_t i)
{
    return i < NOTES ? table->notes[i] : NULL;
}

const bh_totals *bh_table_totals(const bh_table *table)
{
    return &table->end.totals;
}

size_t bh_table_cautions(const bh_table *table)
{
    return table->end.caution_count;
}

const bh_caution *bh_table_caution(const bh_table *table, size_t i)
{
    return &table->end.cautions[i];
}

const bh_diags *bh_table_warnings(const bh_table *table)
{
    return table->end.warnings;
}
