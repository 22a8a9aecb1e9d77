/* evaluate.c - one setting of a plan, computed into its rows. */
#include "beamhours/run/evaluate.h"
#include "beamhours/run/pair.h"

#include <math.h>
#include <stdio.h>

#include "beamhours/units/constants.h"

static size_t bins_of(const bh_setting *setting)
{
    size_t bins = 0;
    for (size_t a = 0; a < setting->arm_count; a++)
        bins += (size_t)setting->arms[a].arm.bins;
    return bins;
}

bh_code bh_evaluator_prepare(bh_evaluator *evaluator, const bh_plan *plan, bh_arena *arena,
                             bh_error *err)
{
    size_t arms = 1, parts = 1;
    for (size_t s = 0; s < plan->setting_count; s++) {
        const bh_setting *setting = &plan->settings[s];
        const size_t needed = setting->arm_count + bins_of(setting);
        arms = setting->arm_count > arms ? setting->arm_count : arms;
        parts = needed > parts ? needed : parts;
    }
    evaluator->parts = bh_arena_take(arena, parts, sizeof *evaluator->parts);
    evaluator->recorded = bh_arena_take(arena, parts, sizeof *evaluator->recorded);
    evaluator->yields = bh_arena_take(arena, arms, sizeof *evaluator->yields);
    evaluator->arms = bh_arena_take(arena, arms, sizeof *evaluator->arms);
    evaluator->effects = bh_arena_take(arena, parts, sizeof *evaluator->effects);
    if (!evaluator->parts || !evaluator->recorded || !evaluator->yields || !evaluator->arms ||
        !evaluator->effects)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    evaluator->yielder.plan = plan;
    const bh_code code = bh_yielder_prepare(&evaluator->yielder, arena, err);
    return code ? code
                : bh_systematics_prepare(&evaluator->systematics, &evaluator->yielder, arena,
                                         evaluator->systematics.causes, err);
}

/* The coincidence in row `a` of a setting, whose arms stand before it. */
static bh_code measure_pair(bh_evaluator *evaluator, const bh_setting *setting, size_t a,
                            bh_error *err)
{
    const bh_setting_arm *arm = &setting->arms[a];
    const size_t one = (size_t)(arm->first - setting->arms);
    const size_t other = (size_t)(arm->second - setting->arms);
    const bh_arm_pair pair = {
        .arm = arm, .one = &evaluator->yields[one], .other = &evaluator->yields[other]};
    const bh_code code = bh_pair_make(&evaluator->yielder, &pair, &evaluator->yields[a], err);
    if (!code)
        bh_pair_record(&evaluator->arms[a], &evaluator->arms[one], &evaluator->arms[other]);
    return code;
}

/* Yields and recorded rates of all arms of a setting. */
static bh_code measure(bh_evaluator *evaluator, const bh_setting *setting, bool bins, bh_error *err)
{
    size_t used = 0;
    bh_code code = BH_OK;
    for (size_t a = 0; !code && a < setting->arm_count; a++) {
        const bh_setting_arm *arm = &setting->arms[a];
        bh_yield *yield = &evaluator->yields[a];
        bh_arm_hours *hours = &evaluator->arms[a];
        *hours = (bh_arm_hours){.yield = yield, .recorded = evaluator->recorded + used};
        yield->part = evaluator->parts + used;
        if (arm->first) {
            code = measure_pair(evaluator, setting, a, err);
            used += (size_t)yield->view.parts;
            continue;
        }
        code = bh_view_make(&evaluator->yielder, setting, arm, &yield->view, err);
        if (bins || arm->arm.bins > 1) /* an arm in bins is their sum, shown or not */
            yield->view.parts = 1 + arm->arm.bins;
        if (!code)
            code = bh_yield_make(&evaluator->yielder, yield, err);
        if (!code)
            code = bh_hours_record(hours, &setting->beam, err);
        used += (size_t)yield->view.parts;
    }
    return code;
}

static void note(const bh_evaluator *evaluator, bh_remark remark)
{
    if (evaluator->yielder.remarks)
        bh_remarks_note(evaluator->yielder.remarks, &remark);
}

/* A bin that could not reach the goal if the whole granted time were spent on its setting. */
static void find_slow_bin(const bh_evaluator *evaluator, const bh_setting_hours *hours,
                          const bh_arm_hours *arm)
{
    const bh_value *available = &evaluator->yielder.plan->schedule.available;
    const bh_setting_arm *plan = arm->yield->view.arm;
    if (!available->given || !plan->each_bin || plan->want != BH_WANT_GOAL)
        return;
    int worst = 0;
    double longest = 0;
    for (int i = 1; i < arm->yield->view.parts; i++) {
        const double needed = bh_hours_to_goal(arm, i) * (1 + hours->share);
        if (needed > longest) {
            longest = needed;
            worst = i;
        }
    }
    if (!(longest > available->value / BH_SECONDS_PER_HOUR))
        return;
    char bin[16];
    snprintf(bin, sizeof bin, "%d", worst);
    note(evaluator, (bh_remark){.kind = BH_REMARK_BIN_TOO_SLOW,
                                .at = plan->wanted.at,
                                .key = "goal",
                                .who = plan->arm.name.text,
                                .what = bin,
                                .setting = hours->setting->name,
                                .high = longest,
                                .from = available->value / BH_SECONDS_PER_HOUR});
}

/* [1] below this share, whoever plans should know: common practice. */
static const double mostly_live = 0.8;

static void find(const bh_evaluator *evaluator, const bh_setting_hours *hours)
{
    for (size_t a = 0; a < hours->setting->arm_count; a++) {
        const bh_arm_hours *arm = &hours->arms[a];
        const bh_setting_arm *plan = arm->yield->view.arm;
        const bh_target *target = hours->setting->target;
        if (arm->live.over_limit)
            note(evaluator, (bh_remark){.kind = BH_REMARK_LIMIT,
                                        .at = plan->at,
                                        .key = "rate_limit",
                                        .who = plan->arm.name.text,
                                        .setting = hours->setting->name,
                                        .high = arm->live.recorded,
                                        .from = plan->arm.rate_limit.value});
        else if (arm->live.dead_part < mostly_live)
            note(evaluator, (bh_remark){.kind = BH_REMARK_DEAD,
                                        .at = plan->at,
                                        .key = "dead_time",
                                        .who = plan->arm.name.text,
                                        .setting = hours->setting->name,
                                        .low = 100 * arm->live.dead_part});
        if (target->empty == BH_EMPTY_NONE && arm->yield->part->windows > 0)
            note(evaluator, (bh_remark){.kind = BH_REMARK_NO_EMPTY,
                                        .at = target->at,
                                        .key = "empty_target",
                                        .who = target->name.text,
                                        .setting = hours->setting->name});
        find_slow_bin(evaluator, hours, arm);
    }
}

bh_code bh_setting_measure(bh_evaluator *evaluator, size_t setting, bool bins,
                           bh_setting_hours *hours, bh_error *err)
{
    const bh_setting *s = &evaluator->yielder.plan->settings[setting];
    bh_workspace_trim(evaluator->yielder.workspace);
    const bh_code code = measure(evaluator, s, bins, err);
    if (code)
        return code;
    *hours = (bh_setting_hours){.setting = s, .arms = evaluator->arms};
    bh_hours_decide(hours);
    return BH_OK;
}

static void put_effects(const bh_evaluator *evaluator, const bh_view *view,
                        const bh_effects *effects, bh_row *row)
{
    const bool any = row->number[BH_COL_SIGNAL] > 0;
    const bool known = bh_systematic_known(view, row->number[BH_COL_Q2]);
    row->effects = known ? *effects : (bh_effects){.count = 0};
    bh_row_put(row, BH_COL_SYSTEMATIC,
               any && known ? bh_effects_total(evaluator->systematics.causes, effects)
                            : (double)NAN,
               any ? BH_WHY_NUCLEAR : BH_WHY_NO_EVENTS);
}

/* The rows of one arm, with those of its bins where they are wanted. */
static bh_code fill_arm(bh_evaluator *evaluator, const bh_setting_hours *hours, size_t arm,
                        const bh_setting_rows *rows, bh_error *err)
{
    const bh_arm_hours *of = &hours->arms[arm];
    const int bins = rows->bins ? of->yield->view.arm->arm.bins : 0;
    bh_row_fill(&evaluator->yielder, hours, of, &rows->whole[arm]);
    for (int b = 0; b < bins; b++)
        bh_row_fill(&evaluator->yielder, hours, of, &rows->bins[b]);
    const bh_code code =
        bh_systematic_arm(&evaluator->systematics, of, 1 + (size_t)bins, evaluator->effects, err);
    if (code)
        return code;
    const bh_view *view = &of->yield->view;
    put_effects(evaluator, view, &evaluator->effects[0], &rows->whole[arm]);
    for (int b = 0; b < bins; b++)
        put_effects(evaluator, view, &evaluator->effects[1 + b], &rows->bins[b]);
    return BH_OK;
}

bh_code bh_setting_evaluate(bh_evaluator *evaluator, size_t setting, bh_setting_rows *out,
                            bh_error *err)
{
    const bh_setting *s = &evaluator->yielder.plan->settings[setting];
    bh_setting_hours hours;
    bh_code code = bh_setting_measure(evaluator, setting, out->bins != NULL, &hours, err);
    if (code)
        return code;
    find(evaluator, &hours);
    bh_setting_rows rows = *out;
    for (size_t a = 0; !code && a < s->arm_count; a++) {
        code = fill_arm(evaluator, &hours, a, &rows, err);
        rows.bins += rows.bins ? s->arms[a].arm.bins : 0;
    }
    out->full = isnan(hours.full) ? 0 : hours.full;
    out->empty = out->full * hours.share;
    return code;
}
