/* drafting.c - which target and which arms a setting names. */
#include "beamhours/plan/drafting.h"

#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/schema/reading.h"

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

bh_code bh_draft_target(const bh_making *making, bh_setting_draft *p)
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

static void add_aim(bh_setting_draft *p, const bh_raw_aim *aim, const bh_arm *arm)
{
    p->aims[p->aim_count] = *aim;
    p->arms[p->aim_count] = arm;
    p->aim_count++;
}

static bool takes_part(const bh_setting_draft *p, const bh_arm *arm)
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
                     const bh_arm *arm, bh_setting_draft *p)
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
static bh_code aims_of_list(const bh_making *making, const bh_raw_setting *own, bh_setting_draft *p)
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
static void aims_of_default(const bh_making *making, const bh_raw_aim *aim, bh_setting_draft *p)
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

static bh_code aims_of_one(const bh_making *making, bh_setting_draft *p)
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

bh_code bh_draft_aims(const bh_making *making, const bh_raw_setting *own, bh_setting_draft *p)
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
