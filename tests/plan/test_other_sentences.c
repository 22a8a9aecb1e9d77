/* test_other_sentences.c - what formulas and tables say that no plan makes them say.
 *
 * tests/bad-plans/elsewhere.txt lists these sentences; each is provoked here, by the call that a
 * program would make.  A sentence that neither a bad plan nor this file provokes fails a test.
 */
#include "sentences.h"

#include <math.h>

#include "beamhours/document/node.h"
#include "beamhours/matter/range.h"
#include "beamhours/physics/background.h"
#include "beamhours/physics/inelastic.h"
#include "beamhours/physics/kinematics.h"
#include "beamhours/physics/quasi_elastic.h"
#include "beamhours/units/constants.h"

static const bh_collision light = {
    .mass = BH_MASS_ELECTRON, .target = BH_MASS_PROTON, .kinetic = 855.0};
static const bh_collision heavy = {
    .mass = BH_MASS_ALPHA, .target = BH_MASS_PROTON, .kinetic = 50.0};

/* --- kinematics: a plan checks its angles and energies first, in words of its own --- */

static bh_code energy(bh_error *err)
{
    bh_event event;
    const bh_collision slow = {.mass = light.mass, .target = light.target, .kinetic = 1e-5};
    return bh_kinematics_scattered(&slow, 0.5, BH_BRANCH_FAST, &event, err);
}

static bh_code angle(bh_error *err)
{
    bh_event event;
    return bh_kinematics_scattered(&light, 3.5, BH_BRANCH_FAST, &event, err);
}

static bh_code unreachable(bh_error *err)
{
    bh_event event;
    return bh_kinematics_scattered(&heavy, 1.0, BH_BRANCH_FAST, &event, err);
}

static bh_code one_branch(bh_error *err)
{
    bh_event event;
    return bh_kinematics_scattered(&light, 0.5, BH_BRANCH_SLOW, &event, err);
}

static bh_code recoil(bh_error *err)
{
    bh_event event;
    return bh_kinematics_recoil(&light, 2.0, &event, err);
}

static bh_code q2(bh_error *err)
{
    bh_event event;
    return bh_kinematics_q2(&light, 5e6, &event, err);
}

static bh_code epsilon(bh_error *err)
{
    bh_event event;
    return bh_kinematics_epsilon(&light, 7.0, &event, err);
}

static bh_code epsilon_of_heavy(bh_error *err)
{
    double kinetic;
    return bh_kinematics_energy_angle_epsilon(&heavy, 0.1, 0.5, &kinetic, err);
}

static bh_code no_energy(bh_error *err)
{
    double kinetic;
    return bh_kinematics_energy(&light, 1e5, 0.0, &kinetic, err);
}

/* --- passage: the reader of materials lets none of these by --- */

static const bh_constituent lead = {.z = 82, .a = 208, .mass = 193687.0, .per_atom = 1.0};
static const bh_particle electron = {.name = "electron", .mass = BH_MASS_ELECTRON, .charge = -1};

static bh_code stop(const bh_particle *particle, const bh_material *material, bh_error *err)
{
    bh_stopping *stopping = NULL;
    const bh_code code = bh_stopping_new(particle, material, 0.0, &stopping, err);
    bh_stopping_free(stopping);
    return code;
}

static bh_code vacuum(bh_error *err)
{
    return stop(&electron, &(const bh_material){.name = "vacuum", .state = BH_STATE_VACUUM}, err);
}

static bh_code density(bh_error *err)
{
    return stop(
        &electron,
        &(const bh_material){.name = "x", .count = 1, .parts = &lead, .mean_atomic_mass = 207.2},
        err);
}

static bh_code element(bh_error *err)
{
    const bh_constituent late = {.z = 96, .a = 247, .mass = 230000.0, .per_atom = 1.0};
    return stop(
        &electron,
        &(const bh_material){
            .name = "x", .count = 1, .parts = &late, .density = 13.5, .mean_atomic_mass = 247.0},
        err);
}

static bh_code elements(bh_error *err)
{
    bh_constituent many[BH_MEDIUM_ELEMENTS + 1];
    for (int i = 0; i < COUNT(many); i++)
        many[i] = (bh_constituent){
            .z = i + 1, .a = 2 * i + 2, .mass = 1e3, .per_atom = 1.0 / COUNT(many)};
    return stop(&electron,
                &(const bh_material){.name = "x",
                                     .count = (size_t)COUNT(many),
                                     .parts = many,
                                     .density = 1.0,
                                     .mean_atomic_mass = 30.0},
                err);
}

static bh_code neutral(bh_error *err)
{
    const bh_particle neutron = {.name = "neutron", .mass = BH_MASS_NEUTRON};
    return stop(
        &neutron,
        &(const bh_material){
            .name = "x", .count = 1, .parts = &lead, .density = 11.3, .mean_atomic_mass = 207.2},
        err);
}

static bh_code slow(bh_error *err)
{
    const bh_material material = {
        .name = "x", .count = 1, .parts = &lead, .density = 11.3, .mean_atomic_mass = 207.2};
    bh_stopping *stopping = NULL;
    bh_range *range = NULL;
    bh_code code = bh_stopping_new(&electron, &material, 0.0, &stopping, err);
    ck_assert_int_eq(code, BH_OK);
    code = bh_range_new(stopping, BH_LOSE_ALL, 1e-6, &range, err);
    bh_range_free(range);
    bh_stopping_free(stopping);
    return code;
}

/* --- backgrounds: remarks of a result, never errors of a plan --- */

static bh_code because(const char *reason, bh_error *err)
{
    ck_assert_ptr_nonnull(reason);
    return bh_fail(err, BH_EDOMAIN, "%s", reason);
}

/* On nucleons at `q2` [MeV^2] and final mass squared `w2` [MeV^2]. */
static bh_code inelastic(int nucleons, double at_q2, double w2, bh_error *err)
{
    const double m = BH_MASS_PROTON, lost = (w2 + at_q2 - m * m) / (2.0 * m);
    const bh_transfer at = {.lost = lost, .q2 = at_q2, .q = sqrt(at_q2 + lost * lost)};
    return because(bh_inelastic_outside(nucleons, &at), err);
}

static bh_code inelastic_low(bh_error *err)
{
    return inelastic(1, 1e6, 1.25e6, err);
}

static bh_code inelastic_breakup(bh_error *err)
{
    return inelastic(2, 1e6, 1e6, err);
}

static bh_code inelastic_q2(bh_error *err)
{
    return inelastic(1, 0.1e6, 2e6, err);
}

static bh_code inelastic_q2_most(bh_error *err)
{
    return inelastic(1, 25e6, 2e6, err);
}

static bh_code inelastic_x(bh_error *err)
{
    return inelastic(1, 30e6, 5e6, err);
}

/* On carbon at three-momentum `q` [MeV/c] and energy `lost` [MeV]. */
static bh_code quasi(double q, double lost, bh_error *err)
{
    bh_quasi_nucleus carbon;
    const bh_transfer at = {.lost = lost, .q = q, .q2 = (q - lost) * (q + lost)};
    ck_assert_int_eq(bh_quasi_find(6, 12, BH_QUASI_SCALING, &carbon, NULL), BH_OK);
    return because(bh_quasi_outside(&carbon, &at), err);
}

static bh_code quasi_slow(bh_error *err)
{
    return quasi(150.0, 60.0, err);
}

static bh_code quasi_fast(bh_error *err)
{
    return quasi(1500.0, 800.0, err);
}

static bh_code quasi_deep(bh_error *err)
{
    return quasi(500.0, 350.0, err);
}

static bh_code quasi_nucleus(bh_error *err)
{
    bh_quasi_nucleus nucleus;
    return bh_quasi_find(2, 4, BH_QUASI_SCALING, &nucleus, err);
}

/* An electron of `kinetic` [MeV] on z, a, seen at `at` [rad]. */
static bh_code seen(const char *name, bh_encounter encounter, double at, bh_error *err)
{
    const bh_momentum_range range = {.angle = at, .momentum_from = 0.0, .momentum_to = INFINITY};
    const bh_background *background = bh_background_find(name);
    bh_background_validity validity = {.reason = NULL};
    double value = -1.0;
    ck_assert_ptr_nonnull(background);
    encounter.beam = &electron;
    background->momentum_integral(&encounter, &range, &value, &validity);
    ck_assert(value >= 0.0);
    return because(validity.reason, err);
}

static bh_code quasi_light(bh_error *err)
{
    return seen("quasi-elastic", (bh_encounter){.z = 2, .a = 4, .kinetic = 855.0}, 0.5, err);
}

static bh_code atomic_bound(bh_error *err)
{
    return seen(bh_background_atomic.name, (bh_encounter){.z = 82, .a = 208, .kinetic = 0.5}, 0.3,
                err);
}

static bh_code background_input(bh_error *err)
{
    return seen("quasi-elastic", (bh_encounter){.z = 6, .a = 12, .kinetic = 855.0}, 0.0, err);
}

/* --- the document: too large to lie in a folder of plans --- */

static bh_code too_long(bh_error *err)
{
    bh_diags *diags = bh_diags_new();
    char *bytes = malloc(BH_DOCUMENT_LIMIT + 1);
    memset(bytes, '#', BH_DOCUMENT_LIMIT + 1);
    ck_assert_ptr_null(bh_document_parse(bytes, BH_DOCUMENT_LIMIT + 1, "long.yaml", diags));
    const bh_code code = because(bh_diags_at(diags, 0)->text, err);
    free(bytes);
    bh_diags_free(diags);
    return code;
}

static const struct {
    const char *name;
    bh_code (*provoke)(bh_error *err);
} rows[] = {
    {"BH_SAY_TOO_LONG", too_long},
    {"BH_SAY_KINEMATICS_ENERGY", energy},
    {"BH_SAY_KINEMATICS_ANGLE", angle},
    {"BH_SAY_KINEMATICS_UNREACHABLE", unreachable},
    {"BH_SAY_KINEMATICS_ONE_BRANCH", one_branch},
    {"BH_SAY_KINEMATICS_RECOIL", recoil},
    {"BH_SAY_KINEMATICS_Q2", q2},
    {"BH_SAY_KINEMATICS_EPSILON", epsilon},
    {"BH_SAY_KINEMATICS_HEAVY", epsilon_of_heavy},
    {"BH_SAY_KINEMATICS_NO_ENERGY", no_energy},
    {"BH_SAY_STOPPING_VACUUM", vacuum},
    {"BH_SAY_STOPPING_DENSITY", density},
    {"BH_SAY_STOPPING_ELEMENT", element},
    {"BH_SAY_STOPPING_ELEMENTS", elements},
    {"BH_SAY_STOPPING_NEUTRAL", neutral},
    {"BH_SAY_STOPPING_ENERGY", slow},
    {"BH_SAY_INELASTIC_LOW", inelastic_low},
    {"BH_SAY_INELASTIC_BREAKUP", inelastic_breakup},
    {"BH_SAY_INELASTIC_Q2", inelastic_q2},
    {"BH_SAY_INELASTIC_Q2_MOST", inelastic_q2_most},
    {"BH_SAY_INELASTIC_X", inelastic_x},
    {"BH_SAY_QUASI_NUCLEUS", quasi_nucleus},
    {"BH_SAY_QUASI_LIGHT", quasi_light},
    {"BH_SAY_QUASI_SLOW", quasi_slow},
    {"BH_SAY_QUASI_FAST", quasi_fast},
    {"BH_SAY_QUASI_DEEP", quasi_deep},
    {"BH_SAY_ATOMIC_BOUND", atomic_bound},
    {"BH_SAY_BACKGROUND_INPUT", background_input},
};

START_TEST(each_is_said)
{
    struct sentences all = {0, calloc(MOST_SENTENCES, sizeof *all.list)};
    bh_text elsewhere = {0};
    int listed = 0, provoked = 0;
    read_sentences(&all);
    ck_assert_int_eq(bh_file_read(FOLDER "/elsewhere.txt", 1 << 20, &elsewhere, NULL), 0);
    for (int i = 0; i < COUNT(rows); i++) {
        bh_error err = {.code = BH_OK};
        ck_assert_msg(rows[i].provoke(&err) != BH_OK, "%s is not provoked", rows[i].name);
        count_sentence(&all, err.text, rows[i].name);
        for (int k = 0; k < all.count; k++)
            if (strcmp(all.list[k].name, rows[i].name) == 0)
                ck_assert_msg(all.list[k].times == 1, "%s: %s", rows[i].name, err.text);
    }
    for (int k = 0; k < all.count; k++) {
        listed += is_elsewhere(all.list[k].name, &elsewhere);
        provoked += all.list[k].times > 0 && is_elsewhere(all.list[k].name, &elsewhere);
        regfree(&all.list[k].pattern);
    }
    ck_assert_int_eq(provoked, listed);
    ck_assert_int_eq(listed, COUNT(rows));
    bh_text_free(&elsewhere);
    free(all.list);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("other sentences");
    tcase_add_test(tests, each_is_said);
    return run_suite("other sentences", tests);
}
