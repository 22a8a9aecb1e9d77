/* settings.c - settings: what they need not repeat, overrides, sweeps. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/drafting.h"
#include "beamhours/schema/reading.h"

/* --- sweeps --- */

struct swept {
    const bh_sweep *sweep;
    const char *name;
    const bh_section *section;
};

static void note_sweep(const bh_making *making, struct swept next, struct swept *first)
{
    if (!next.sweep->given || !next.sweep->swept)
        return;
    /* Arms that move together share one sweep of the setting. */
    if (first->sweep && first->sweep->node != next.sweep->node)
        bh_tell(making, next.sweep->at, next.section, next.name, BH_SAY_TWO_SWEEPS, first->name,
                next.name);
    else
        *first = next;
}

static void find_sweep(const bh_making *making, bh_setting_draft *p)
{
    struct swept first = {.sweep = NULL};
    const bh_raw_beam *beam = &p->raw.beam;
    note_sweep(making, (struct swept){&beam->kinetic_energy, "kinetic_energy", &beam->section},
               &first);
    note_sweep(making, (struct swept){&beam->total_energy, "total_energy", &beam->section}, &first);
    note_sweep(making, (struct swept){&beam->momentum, "momentum", &beam->section}, &first);
    note_sweep(making, (struct swept){&beam->current, "current", &beam->section}, &first);
    for (size_t i = 0; i < p->aim_count; i++) {
        const bh_raw_aim *aim = &p->aims[i];
        note_sweep(making, (struct swept){&aim->angle, "angle", &aim->section}, &first);
        note_sweep(making, (struct swept){&aim->q2, "q2", &aim->section}, &first);
    }
    p->swept = first.sweep;
    p->steps = first.sweep && first.sweep->count > 0 ? first.sweep->count : 1;
}

/* --- one setting as written --- */

static bh_code prepare(const bh_making *making, const bh_raw_setting *own, size_t i,
                       bh_setting_draft *p)
{
    bh_schema_merge(&bh_schema_setting, &making->raw.every_setting, own, &p->raw);
    p->raw.section = own->section;
    p->name = own->name.text;
    if (!p->name) {
        char *number = bh_arena_take(making->reading.arena, 1, 24);
        if (!number)
            return BH_ENOMEM;
        (void)snprintf(number, 24, "%zu", i + 1);
        p->name = number;
    }
    bh_schema_merge(&bh_schema_beam, &making->raw.beam, &p->raw.beam, &p->beam);
    p->wants = p->raw.aim;
    p->wants.section = own->section;
    if (p->raw.coincidence.section.given) /* what the setting wants is not each arm's */
        bh_forget_wants(&p->raw.aim);
    bh_check_process(making, &p->raw.section, &p->raw.process);
    if (bh_draft_target(making, p) || bh_draft_aims(making, own, p))
        return BH_ENOMEM;
    find_sweep(making, p);
    return BH_OK;
}

/* --- settings after sweeps --- */

static void fill_row(const bh_making *making, const bh_setting_draft *p, size_t step,
                     const bh_setting *setting, bh_setting_arm *row)
{
    const size_t which = (size_t)(row - setting->arms);
    const bh_raw_aim *aim = &p->aims[which];
    const bh_arm *arm = p->arms[which];
    const char *name;
    *row = (bh_setting_arm){.arm = *arm, .at = aim->section.at};
    if (aim->prescale.given && aim->prescale.value >= 1.0)
        row->arm.prescale = (int)aim->prescale.value;
    row->central_momentum = aim->central_momentum;
    const bh_value *wanted = bh_want_of(aim, &row->want, &name);
    if (wanted)
        row->wanted = *wanted;
    row->each_bin = aim->goal_for.text && strcmp(aim->goal_for.text, "each-bin") == 0;
    if (arm->shape == BH_SHAPE_RING) {
        row->angle = (bh_value){.at = aim->section.at};
    } else if (arm->angle.given) {
        row->angle = arm->angle;
    } else if (aim->q2.given) {
        row->q2 = bh_sweep_value(&aim->q2, step);
    } else if (aim->angle.word) { /* follows from another arm */
        row->angle = (bh_value){.value = NAN, .given = true, .at = aim->angle.at};
        return;
    } else {
        row->angle = bh_sweep_value(&aim->angle, step);
        if (!aim->angle.given && aim->section.node)
            bh_tell(making, aim->section.at, &aim->section, "angle", BH_SAY_NO_ANGLE,
                    arm->name.text ? arm->name.text : "?", p->name);
    }
    const bh_sight sight = {making, aim, setting, row};
    bh_check_row(&sight);
}

static bh_code fill_setting(const bh_making *making, const bh_setting_draft *p, size_t step,
                            bh_setting *out)
{
    const size_t size = strlen(p->name) + 24;
    char *name = bh_arena_take(making->reading.arena, 1, size);
    const size_t joint = p->raw.coincidence.section.given ? 1 : 0;
    bh_setting_arm *rows = bh_arena_take(making->reading.arena, p->aim_count + joint, sizeof *rows);
    if (!name || !rows)
        return BH_ENOMEM;
    if (p->swept)
        (void)snprintf(name, size, "%s.%zu", p->name, step + 1);
    else
        (void)snprintf(name, size, "%s", p->name);
    *out = (bh_setting){.name = name,
                        .target = p->target,
                        .tilt = p->raw.tilt,
                        .process = p->raw.process,
                        .arm_count = p->aim_count,
                        .arms = rows,
                        .at = p->raw.section.at};
    if (!p->raw.tilt.given && p->target)
        out->tilt = p->target->tilt;
    if (!p->raw.process.given)
        out->process = making->plan.models.process;
    if (!p->raw.beam.section.given)
        out->beam = making->plan.beam;
    else if (bh_make_beam(making, &p->beam, step, &out->beam))
        return BH_ENOMEM;
    for (size_t i = 0; i < p->aim_count; i++)
        fill_row(making, p, step, out, &rows[i]);
    const bh_joining joining = {.making = making,
                                .raw = &p->raw.coincidence,
                                .aims = p->aims,
                                .wants = &p->wants,
                                .setting = out,
                                .rows = rows};
    bh_place_conjugates(&joining);
    return p->raw.coincidence.section.given ? bh_add_coincidence(&joining) : BH_OK;
}

/* --- all of them --- */

/* Counts settings and bins before memory is taken for them; false past a limit. */
static bool within_limits(const bh_making *making, const bh_setting_draft *all, size_t n,
                          size_t *total)
{
    const bh_section *section = &making->raw.section;
    const bh_mark at = making->raw.settings.at;
    size_t bins = 0;
    *total = 0;
    for (size_t i = 0; i < n; i++) {
        *total += all[i].steps;
        size_t most = 0;
        for (size_t k = 0; k < all[i].aim_count; k++) {
            bins += all[i].steps * (size_t)all[i].arms[k]->bins;
            most = (size_t)all[i].arms[k]->bins > most ? (size_t)all[i].arms[k]->bins : most;
        }
        if (all[i].raw.coincidence.section.given) /* as many as its first arm has */
            bins += all[i].steps * most;
    }
    if (*total > BH_MOST_SETTINGS)
        bh_tell(making, at, section, "settings", BH_SAY_MANY_SETTINGS, *total, BH_MOST_SETTINGS);
    else if (bins > BH_MOST_BINS)
        bh_tell(making, at, section, "settings", BH_SAY_ALL_BINS, bins, BH_MOST_BINS);
    else
        return true;
    return false;
}

static bh_code write_out(bh_making *making, const bh_setting_draft *all, size_t n, size_t total)
{
    bh_setting *settings = bh_arena_take(making->reading.arena, total + 1, sizeof *settings);
    size_t k = 0;
    if (!settings)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++)
        for (size_t step = 0; step < all[i].steps; step++)
            if (fill_setting(making, &all[i], step, &settings[k++]))
                return BH_ENOMEM;
    making->plan.settings = settings;
    making->plan.setting_count = k;
    return BH_OK;
}

bh_code bh_make_settings(bh_making *making)
{
    const bh_raw_setting *own = making->raw.settings.items;
    const bh_raw_setting *every = &making->raw.every_setting;
    const size_t n = making->raw.settings.count;
    size_t total;
    if (every->name.given)
        bh_tell(making, every->name.at, &every->section, "name", BH_SAY_NOT_EVERY);
    if (n > BH_MOST_SETTINGS) {
        bh_tell(making, making->raw.settings.at, &making->raw.section, "settings",
                BH_SAY_MANY_SETTINGS, n, BH_MOST_SETTINGS);
        return BH_OK;
    }
    bh_setting_draft *all = bh_arena_take(making->reading.arena, n + 1, sizeof *all);
    if (!all)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++)
        if (prepare(making, &own[i], i, &all[i]))
            return BH_ENOMEM;
    return within_limits(making, all, n, &total) ? write_out(making, all, n, total) : BH_OK;
}
