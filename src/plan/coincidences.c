/* coincidences.c - two arms of one setting for the two particles of one event. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/rates/coincidence.h"
#include "beamhours/schema/reading.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

void bh_forget_wants(bh_raw_aim *aim)
{
    bh_value *wants[] = {&aim->goal, &aim->time, &aim->charge, &aim->counts};
    for (size_t i = 0; i < sizeof wants / sizeof wants[0]; i++)
        *wants[i] = (bh_value){.given = false};
}

bh_acceptance_spec bh_arm_acceptance(const bh_setting_arm *arm)
{
    const bh_arm *a = &arm->arm;
    static const bh_acceptance_shape shapes[] = {[BH_SHAPE_RECTANGLE] = BH_ACCEPTANCE_RECTANGLE,
                                                 [BH_SHAPE_RING] = BH_ACCEPTANCE_RING,
                                                 [BH_SHAPE_POINT] = BH_ACCEPTANCE_POINT};
    bh_acceptance_spec spec = {.shape = shapes[a->shape],
                               .angle = arm->angle.value,
                               .solid_angle = a->solid_angle.given ? a->solid_angle.value : 0,
                               .bins = a->bins,
                               .edges = a->edges};
    if (a->shape == BH_SHAPE_RING) {
        spec.angle = 0;
        spec.ring_from = a->ring.from;
        spec.ring_to = a->ring.to;
        spec.azimuth = a->azimuth.value;
    } else if (a->shape == BH_SHAPE_RECTANGLE) {
        spec.in_plane_from = a->in_plane.from;
        spec.in_plane_to = a->in_plane.to;
        spec.out_of_plane_from = a->out_of_plane.from;
        spec.out_of_plane_to = a->out_of_plane.to;
    }
    return spec;
}

static const char *name_of(const bh_setting_arm *row)
{
    return row->arm.name.text ? row->arm.name.text : "?";
}

/* Beam and scatterer; false where one of them is not known. */
static bool collision_of(const bh_setting *setting, bh_collision *out, char nuclide[8])
{
    bh_constituent main;
    if (!(setting->beam.kinetic_energy.value > 0) || !(setting->beam.particle.mass > 0))
        return false;
    if (!setting->target || !bh_main_nuclide(setting->target, &main))
        return false;
    *out = (bh_collision){.mass = setting->beam.particle.mass,
                          .target = main.mass,
                          .kinetic = setting->beam.kinetic_energy.value};
    bh_nuclide_name(main.z, main.a, nuclide);
    return true;
}

/* --- conjugate angles --- */

static bool is_conjugate(const bh_joining *j, size_t i)
{
    return j->aims[i].angle.word && isnan(j->rows[i].angle.value) && !j->aims[i].q2.given;
}

static bool called(const bh_setting_arm *row, const bh_word *name)
{
    return name->text && row->arm.name.text && strcmp(row->arm.name.text, name->text) == 0;
}

/* The row that `name` names; arm_count where there is none. */
static size_t row_called(const bh_joining *j, const bh_word *name)
{
    size_t i = 0;
    while (i < j->setting->arm_count && !called(&j->rows[i], name))
        i++;
    return i;
}

/* Whose partner row i looks for: the other one of the coincidence, else of two arms; arm_count
 * where it is not plain. */
static size_t partner_of(const bh_joining *j, size_t i)
{
    const size_t count = j->setting->arm_count;
    const bh_words *arms = &j->raw->arms;
    for (size_t k = 0; j->raw->section.given && arms->count == 2 && k < 2; k++)
        if (called(&j->rows[i], &arms->items[k]))
            return row_called(j, &arms->items[1 - k]);
    return count == 2 ? 1 - i : count;
}

static void place(const bh_joining *j, size_t i)
{
    bh_setting_arm *row = &j->rows[i];
    const bh_raw_aim *aim = &j->aims[i];
    const size_t other = partner_of(j, i);
    if (other == j->setting->arm_count || other == i || is_conjugate(j, other) ||
        j->rows[other].arm.shape == BH_SHAPE_RING) {
        bh_tell(j->making, aim->angle.at, &aim->section, "angle", BH_SAY_CONJUGATE_ALONE,
                name_of(row), j->setting->name);
        return;
    }
    const bh_setting_arm *there = &j->rows[other];
    bh_collision collision;
    char nuclide[8];
    if (isnan(there->angle.value) || !collision_of(j->setting, &collision, nuclide))
        return;
    /* Of two arms that detect either particle the other one's is the scattered. */
    const bool recoil =
        there->arm.detects == BH_DETECTS_RECOIL ||
        (there->arm.detects == BH_DETECTS_EITHER && row->arm.detects == BH_DETECTS_SCATTERED);
    row->angle.value = bh_pair_partner(
        &collision, recoil ? BH_DETECTED_RECOIL : BH_DETECTED_SCATTERED, there->angle.value);
    if (!isnan(row->angle.value)) {
        const bh_sight sight = {j->making, aim, j->setting, row};
        bh_check_row(&sight);
        return;
    }
    /* What no event reaches was said of the other arm, unless it may also detect the other kind. */
    if (there->arm.detects == BH_DETECTS_EITHER) {
        char angle[BH_QUANTITY_SIZE];
        bh_tell(j->making, aim->angle.at, &aim->section, "angle", BH_SAY_CONJUGATE_NONE,
                name_of(there), bh_angle_text(there->angle.value, angle));
    }
}

void bh_place_conjugates(const bh_joining *joining)
{
    for (size_t i = 0; i < joining->setting->arm_count; i++)
        if (is_conjugate(joining, i))
            place(joining, i);
}

/* --- who is joined --- */

static void tell(const bh_joining *j, const bh_word *arm, const char *text)
{
    bh_tell(j->making, arm->at, &j->raw->section, "arms", "%s", text);
}

static bh_code tell_absent(const bh_joining *j, const bh_word *name)
{
    const bh_plan *plan = &j->making->plan;
    bool known = false;
    const char **names =
        bh_arena_take(j->making->reading.arena, plan->arm_count + 1, sizeof *names);
    if (!names)
        return BH_ENOMEM;
    for (size_t i = 0; i < plan->arm_count; i++) {
        names[i] = plan->arms[i].name.text;
        known = known || (names[i] && strcmp(names[i], name->text) == 0);
    }
    const bh_unfound unfound = {&j->raw->section, "arms", name, names, plan->arm_count};
    if (known)
        bh_tell(j->making, name->at, &j->raw->section, "arms", BH_SAY_PAIR_ABSENT, name->text,
                j->setting->name);
    else if (plan->arm_count > 0)
        bh_tell_no_arm(j->making, &unfound);
    return BH_OK;
}

/* Fills the rows of both arms; false after a complaint. */
static bool find_rows(const bh_joining *j, const bh_setting_arm *pair[2], bh_code *code)
{
    const bh_words *arms = &j->raw->arms;
    if (!arms->given || arms->count == 0) /* which was said */
        return false;
    if (arms->count != 2) {
        bh_tell(j->making, arms->at, &j->raw->section, "arms", BH_SAY_PAIR_TWO,
                arms->count == 1 ? "one is" : "more are");
        return false;
    }
    for (size_t k = 0; k < 2; k++) {
        const size_t i = row_called(j, &arms->items[k]);
        pair[k] = i < j->setting->arm_count ? &j->rows[i] : NULL;
        if (!pair[k] && arms->items[k].text && !*code)
            *code = tell_absent(j, &arms->items[k]);
    }
    if (pair[0] && pair[0] == pair[1])
        bh_tell(j->making, arms->items[1].at, &j->raw->section, "arms", BH_SAY_PAIR_SAME,
                name_of(pair[0]));
    return pair[0] && pair[1] && pair[0] != pair[1];
}

/* --- whether it makes sense --- */

/* Events of which the first arm has `first`. */
struct events {
    bh_collision in;
    bh_detected first;
};

static void every(void *context, size_t n, const double *theta, bh_pair_value *value)
{
    const struct events *c = context;
    for (size_t i = 0; i < n; i++)
        value[i] = (bh_pair_value){1, 1, bh_pair_partner(&c->in, c->first, theta[i])};
}

/* Whether some event has `first` in the first arm and its partner in the second; true where it
 * cannot be told. */
static bool shared(const bh_collision *in, bh_detected first, const bh_setting_arm *const pair[2])
{
    bh_acceptance one, two;
    const bh_acceptance_spec specs[2] = {bh_arm_acceptance(pair[0]), bh_arm_acceptance(pair[1])};
    if (bh_acceptance_make(&specs[0], &one, NULL) || bh_acceptance_make(&specs[1], &two, NULL))
        return true;
    double breaks[BH_PAIR_BREAKS];
    struct events context = {*in, first};
    const bh_pair_request request = {
        .shape = {&one.whole, &two.whole, pair[0]->arm.side != pair[1]->arm.side},
        .function = every,
        .context = &context,
        .limit = first == BH_DETECTED_RECOIL ? BH_PI / 2 : bh_kinematics_largest_angle(in),
        .break_count = bh_pair_breaks(in, first, &two.whole, breaks),
        .breaks = breaks,
        .tolerance = 1e-2};
    bh_pair_sum sum;
    return bh_pair_add_up(&request, &sum, NULL) || sum.solid_angle > 0;
}

static void check_overlap(const bh_joining *j, const bh_setting_arm *const pair[2])
{
    static const bh_detected all[] = {BH_DETECTED_SCATTERED, BH_DETECTED_SLOW, BH_DETECTED_RECOIL};
    bh_collision in;
    char nuclide[8];
    if (!collision_of(j->setting, &in, nuclide))
        return;
    for (size_t i = 0; i < sizeof all / sizeof all[0]; i++) {
        const bool recoil = all[i] == BH_DETECTED_RECOIL;
        const bh_detects first = pair[0]->arm.detects, second = pair[1]->arm.detects;
        const bh_detects not_first = recoil ? BH_DETECTS_SCATTERED : BH_DETECTS_RECOIL;
        const bh_detects not_second = recoil ? BH_DETECTS_RECOIL : BH_DETECTS_SCATTERED;
        if (first == not_first || second == not_second ||
            (all[i] == BH_DETECTED_SLOW && in.mass <= in.target))
            continue;
        if (shared(&in, all[i], pair))
            return;
    }
    bh_tell(j->making, j->raw->arms.at, &j->raw->section, "arms", BH_SAY_PAIR_APART,
            j->setting->beam.particle.name, nuclide, name_of(pair[0]), name_of(pair[1]));
}

static bool makes_sense(const bh_joining *j, const bh_setting_arm *const pair[2], const char *name)
{
    const bh_words *arms = &j->raw->arms;
    char text[256];
    bool sense = true;
    for (size_t k = 0; k < 2; k++)
        if (pair[k]->arm.shape == BH_SHAPE_POINT) {
            (void)snprintf(text, sizeof text, BH_SAY_PAIR_POINT, name_of(pair[k]));
            tell(j, &arms->items[k], text);
            sense = false;
        }
    for (size_t i = 0; i < j->setting->arm_count; i++)
        if (j->rows[i].arm.name.text && strcmp(j->rows[i].arm.name.text, name) == 0) {
            (void)snprintf(text, sizeof text, BH_SAY_PAIR_NAME, name);
            tell(j, &arms->items[0], text);
            sense = false;
        }
    if (pair[0]->arm.detects == pair[1]->arm.detects && pair[0]->arm.detects != BH_DETECTS_EITHER) {
        const bool recoil = pair[0]->arm.detects == BH_DETECTS_RECOIL;
        bh_tell(j->making, arms->items[1].at, &j->raw->section, "arms", BH_SAY_PAIR_DETECTS,
                name_of(pair[0]), name_of(pair[1]), recoil ? "struck" : "scattered",
                recoil ? "scattered" : "recoil");
        sense = false;
    }
    return sense;
}

/* --- its row --- */

static bh_value product(const bh_value *a, const bh_value *b)
{
    bh_value out = *a;
    out.value = a->value * b->value;
    out.uncertainty = hypot(a->uncertainty * b->value, b->uncertainty * a->value);
    return out;
}

static void set_row(const bh_joining *j, const bh_setting_arm *const pair[2], const char *name,
                    bh_setting_arm *row)
{
    const char *key;
    *row = *pair[0];
    row->arm.name.text = name;
    row->arm.efficiency = product(&pair[0]->arm.efficiency, &pair[1]->arm.efficiency);
    row->arm.prescale = pair[0]->arm.prescale * pair[1]->arm.prescale;
    row->arm.dead_time = (bh_value){.at = pair[0]->arm.dead_time.at};
    row->arm.rate_limit = (bh_value){.at = pair[0]->arm.rate_limit.at};
    row->arm.other_rate = (bh_value){.at = pair[0]->arm.other_rate.at};
    row->first = pair[0];
    row->second = pair[1];
    row->window = j->raw->window;
    row->wanted = (bh_value){.given = false};
    const bh_value *wanted = bh_want_of(j->wants, &row->want, &key);
    if (wanted)
        row->wanted = *wanted;
    row->each_bin = j->wants->goal_for.text && strcmp(j->wants->goal_for.text, "each-bin") == 0;
    row->at = j->raw->section.at;
}

bh_code bh_add_coincidence(const bh_joining *joining)
{
    const bh_setting_arm *pair[2];
    bh_code code = BH_OK;
    if (!find_rows(joining, pair, &code))
        return code;
    const size_t size = strlen(name_of(pair[0])) + strlen(name_of(pair[1])) + 2;
    char *name = bh_arena_take(joining->making->reading.arena, size, 1);
    if (!name)
        return BH_ENOMEM;
    (void)snprintf(name, size, "%s+%s", name_of(pair[0]), name_of(pair[1]));
    if (!makes_sense(joining, pair, name))
        return BH_OK;
    check_overlap(joining, pair);
    set_row(joining, pair, name, &joining->rows[joining->setting->arm_count++]);
    return BH_OK;
}
