/* settings.c - settings: what they need not repeat, overrides, sweeps, arms. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/schema/reading.h"

/* A setting with all that it inherits, before its sweep is written out. */
struct prepared {
    bh_raw_setting raw; /* every_setting beneath it */
    bh_raw_beam beam;   /* the plan's beneath the setting's */
    const bh_target *target;
    const char *name;
    size_t aim_count;
    bh_raw_aim wants;    /* of the setting: with a coincidence, its alone */
    bh_raw_aim *aims;    /* one for each arm that takes part */
    const bh_arm **arms; /* of each aim */
    const bh_sweep *swept;
    size_t steps; /* 1 where nothing is swept */
};

/* --- names --- */

static const char **arm_names(const bh_making *making)
{
    const char **names =
        bh_arena_take(making->reading.arena, making->plan.arm_count + 1, sizeof *names);
    for (size_t i = 0; names && i < making->plan.arm_count; i++)
        names[i] = making->arms[i].name.text;
    return names;
}

/* Whether a target has lost its name to another error: it may be the one that is meant. */
static bool some_unread(const bh_making *making)
{
    const size_t n = making->plan.target_count;
    for (size_t i = 0; i < n; i++)
        if (!making->targets[i].name.given && (n > 1 || making->targets[i].layer_count == 0))
            return true;
    return false;
}

static bh_code find_target(const bh_making *making, struct prepared *p)
{
    const bh_word *word = &p->raw.target;
    const size_t n = making->plan.target_count;
    if (!word->given) {
        p->target = n == 1 ? &making->targets[0] : NULL;
        if (n > 1 && making->targets[0].name.text)
            bh_tell(making, p->raw.section.at, &p->raw.section, "target", BH_SAY_WHICH_TARGET,
                    making->targets[0].name.text);
        return BH_OK;
    }
    if (!word->text)
        return BH_OK;
    const char **names = bh_arena_take(making->reading.arena, n + 1, sizeof *names);
    if (!names)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++) {
        names[i] = making->targets[i].name.text;
        if (names[i] && strcmp(names[i], word->text) == 0)
            p->target = &making->targets[i];
    }
    const bh_unfound unfound = {&p->raw.section, "target", word, names, n};
    if (!p->target && n > 0 && !some_unread(making))
        bh_tell_no_target(making, &unfound);
    return BH_OK;
}

static bh_code find_arm(const bh_making *making, const bh_raw_aim *aim, const bh_arm **out)
{
    *out = NULL;
    for (size_t i = 0; i < making->plan.arm_count && aim->arm.text; i++) {
        const char *name = making->arms[i].name.text;
        if (name && strcmp(name, aim->arm.text) == 0)
            *out = &making->arms[i];
    }
    if (*out || !aim->arm.text || making->plan.arm_count == 0)
        return BH_OK;
    const char **names = arm_names(making);
    if (!names)
        return BH_ENOMEM;
    for (size_t i = 0; i < making->plan.arm_count; i++)
        if (!names[i])
            return BH_OK; /* its name could not be read: that was said, and it may be the one */
    const bh_unfound unfound = {&aim->section, "arm", &aim->arm, names, making->plan.arm_count};
    bh_tell_no_arm(making, &unfound);
    return BH_OK;
}

/* --- which arms take part --- */

static bool needs_angle(const bh_arm *arm)
{
    return arm->shape != BH_SHAPE_RING && !arm->angle.given;
}

/* What the setting says for all its arms does not move one that cannot move. */
static void forget_place(bh_raw_aim *aim)
{
    aim->angle = (bh_sweep){.given = false};
    aim->q2 = (bh_sweep){.given = false};
}

static void say_cannot_move(const bh_making *making, const bh_raw_aim *aim, const bh_arm *arm)
{
    const bool by_angle = aim->angle.given;
    const bh_mark at = by_angle ? aim->angle.at : aim->q2.at;
    const char *key = by_angle ? "angle" : "q2";
    const char *name = arm->name.text ? arm->name.text : "?";
    if (!by_angle && !aim->q2.given)
        return;
    if (arm->shape == BH_SHAPE_RING) {
        bh_tell(making, at, &aim->section, key, BH_SAY_RING_ANGLE, name, key);
        return;
    }
    char angle[BH_QUANTITY_SIZE];
    bh_tell(making, at, &aim->section, key, BH_SAY_ARM_FIXED, name,
            bh_angle_text(arm->angle.value, angle), key);
}

static void add_aim(struct prepared *p, const bh_raw_aim *aim, const bh_arm *arm)
{
    p->aims[p->aim_count] = *aim;
    p->arms[p->aim_count] = arm;
    p->aim_count++;
}

static bool takes_part(const struct prepared *p, const bh_arm *arm)
{
    for (size_t i = 0; i < p->aim_count; i++)
        if (p->arms[i] == arm)
            return true;
    return false;
}

const bh_value *bh_want_of(const bh_raw_aim *aim, bh_want *want, const char **name)
{
    const struct {
        bh_want want;
        const char *name;
        const bh_value *value;
    } choice[] = {{BH_WANT_GOAL, "goal", &aim->goal},
                  {BH_WANT_TIME, "time", &aim->time},
                  {BH_WANT_CHARGE, "charge", &aim->charge},
                  {BH_WANT_COUNTS, "counts", &aim->counts}};
    *want = BH_WANT_NOTHING;
    *name = NULL;
    for (size_t i = 0; i < sizeof choice / sizeof choice[0]; i++)
        if (choice[i].value->given) {
            *want = choice[i].want;
            *name = choice[i].name;
            return choice[i].value;
        }
    return NULL;
}

/* The arm of one item of a list; NULL after a complaint. */
static bh_code arm_of_item(const bh_making *making, const bh_raw_aim *aim, const bh_arm **arm)
{
    *arm = NULL;
    if (aim->arm.given)
        return find_arm(making, aim, arm);
    if (making->plan.arm_count == 1)
        *arm = &making->arms[0];
    else if (aim->section.node && making->plan.arm_count > 1 && making->arms[0].name.text)
        bh_tell(making, aim->section.at, &aim->section, "arm", BH_SAY_WHICH_ARM,
                making->arms[0].name.text);
    return BH_OK;
}

static void add_item(const bh_making *making, const bh_raw_aim *item, const bh_raw_aim *merged,
                     const bh_arm *arm, struct prepared *p)
{
    bh_raw_aim aim = *merged;
    if (takes_part(p, arm))
        bh_tell(making, aim.arm.at, &aim.section, "arm", BH_SAY_ARM_TWICE, arm->name.text, p->name);
    if (!needs_angle(arm)) {
        say_cannot_move(making, item, arm);
        forget_place(&aim);
    }
    add_aim(p, &aim, arm);
}

/* A list of arms: each lays its own keys on what the setting says for all. */
static bh_code aims_of_list(const bh_making *making, const bh_raw_setting *own, struct prepared *p)
{
    const bh_raw_aim *items = p->raw.arms.items;
    bh_raw_aim shared = p->raw.aim;
    bh_want want;
    const char *setting_want, *arm_want;
    shared.arm = (bh_word){.text = NULL};
    (void)bh_want_of(&own->aim, &want, &setting_want);
    for (size_t i = 0; i < p->raw.arms.count; i++) {
        bh_raw_aim aim;
        const bh_arm *arm;
        bh_schema_merge(&bh_schema_aim, &shared, &items[i], &aim);
        aim.section = items[i].section;
        const bh_value *value = bh_want_of(&items[i], &want, &arm_want);
        if (value && setting_want && !p->raw.coincidence.section.given)
            bh_tell(making, value->at, &aim.section, arm_want, BH_SAY_WANT_TWICE, arm_want,
                    setting_want);
        if (arm_of_item(making, &aim, &arm))
            return BH_ENOMEM;
        if (arm)
            add_item(making, &items[i], &aim, arm, p);
    }
    return BH_OK;
}

/* No arm is named: the only one that is not fixed, or all of them where all are. */
static void aims_of_default(const bh_making *making, const bh_raw_aim *aim, struct prepared *p)
{
    const bh_arm *free = NULL;
    size_t count = 0;
    for (size_t i = 0; i < making->plan.arm_count; i++)
        if (!making->arms[i].angle.given) {
            free = count++ ? free : &making->arms[i];
        }
    if (count > 1 && free->name.text) {
        bh_tell(making, p->raw.section.at, &p->raw.section, "arm", BH_SAY_WHICH_ARM,
                free->name.text);
    } else if (count == 1) {
        if (!needs_angle(free))
            say_cannot_move(making, aim, free);
        add_aim(p, aim, free);
    } else {
        for (size_t i = 0; i < making->plan.arm_count; i++) {
            say_cannot_move(making, aim, &making->arms[i]);
            add_aim(p, aim, &making->arms[i]);
            forget_place(&p->aims[p->aim_count - 1]);
        }
    }
}

static bh_code aims_of_one(const bh_making *making, struct prepared *p)
{
    bh_raw_aim aim = p->raw.aim;
    const bh_arm *arm;
    aim.section = p->raw.section;
    if (!aim.arm.given) {
        aims_of_default(making, &aim, p);
        return BH_OK;
    }
    if (find_arm(making, &aim, &arm))
        return BH_ENOMEM;
    if (!arm)
        return BH_OK;
    if (!needs_angle(arm)) {
        say_cannot_move(making, &aim, arm);
        forget_place(&aim);
    }
    add_aim(p, &aim, arm);
    return BH_OK;
}

static bh_code set_aims(const bh_making *making, const bh_raw_setting *own, struct prepared *p)
{
    const size_t room = p->raw.arms.count + making->plan.arm_count + 1;
    p->aims = bh_arena_take(making->reading.arena, room, sizeof *p->aims);
    p->arms = bh_arena_take(making->reading.arena, room, sizeof(const bh_arm *));
    if (!p->aims || !p->arms)
        return BH_ENOMEM;
    const bh_code code = p->raw.arms.given ? aims_of_list(making, own, p) : aims_of_one(making, p);
    for (size_t i = 0; i < making->plan.arm_count && !code; i++)
        if (making->arms[i].angle.given && !takes_part(p, &making->arms[i])) {
            const bh_raw_aim blank = {.section = p->raw.section};
            add_aim(p, &blank, &making->arms[i]);
        }
    return code;
}

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

static void find_sweep(const bh_making *making, struct prepared *p)
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
                       struct prepared *p)
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
    if (find_target(making, p) || set_aims(making, own, p))
        return BH_ENOMEM;
    find_sweep(making, p);
    return BH_OK;
}

/* --- settings after sweeps --- */

static void fill_row(const bh_making *making, const struct prepared *p, size_t step,
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

static bh_code fill_setting(const bh_making *making, const struct prepared *p, size_t step,
                            bh_setting *out)
{
    const size_t size = strlen(p->name) + 24;
    char *name = bh_arena_take(making->reading.arena, 1, size);
    bh_setting_arm *rows = bh_arena_take(making->reading.arena, p->aim_count + 2, sizeof *rows);
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
static bool within_limits(const bh_making *making, const struct prepared *all, size_t n,
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

static bh_code write_out(bh_making *making, const struct prepared *all, size_t n, size_t total)
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
    struct prepared *all = bh_arena_take(making->reading.arena, n + 1, sizeof *all);
    if (!all)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++)
        if (prepare(making, &own[i], i, &all[i]))
            return BH_ENOMEM;
    return within_limits(making, all, n, &total) ? write_out(making, all, n, total) : BH_OK;
}
