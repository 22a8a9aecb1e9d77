/* test_dump.c - the dump of a plan holds every default and reads back to the same plan. */
#include "../suite.h"

#include <stdlib.h>

#include "beamhours/base/text.h"
#include "beamhours/plan/dump.h"
#include "reading.h"

/* Writes flow notation, which is a plan again. */
struct writer {
    bh_text text;
    bool first[40];
    char close[40];
    int depth;
};

static void key_of(struct writer *w, const char *key)
{
    if (w->depth > 0)
        bh_text_append(&w->text, w->first[w->depth] ? "" : ", ");
    w->first[w->depth] = false;
    if (key)
        bh_text_appendf(&w->text, "%s: ", key);
}

static void open_with(struct writer *w, const char *key, const char *bracket)
{
    key_of(w, key);
    bh_text_append_bytes(&w->text, bracket, 1);
    w->depth++;
    w->first[w->depth] = true;
    w->close[w->depth] = bracket[1];
}

static void begin_mapping(void *to, const char *key)
{
    open_with(to, key, "{}");
}

static void begin_list(void *to, const char *key)
{
    open_with(to, key, "[]");
}

static void end(void *to)
{
    struct writer *w = to;
    bh_text_append_bytes(&w->text, &w->close[w->depth--], 1);
}

static void text(void *to, const char *key, const char *value)
{
    struct writer *w = to;
    key_of(w, key);
    bh_text_appendf(&w->text, "\"%s\"", value);
}

static void integer(void *to, const char *key, long value)
{
    struct writer *w = to;
    key_of(w, key);
    bh_text_appendf(&w->text, "%ld", value);
}

static char *dump(const bh_plan *plan)
{
    const bh_dump_sink sink = {begin_mapping, begin_list, end, text, integer};
    struct writer w = {.depth = 0};
    bh_plan_dump(plan, &sink, &w);
    ck_assert_int_eq(w.depth, 0);
    return bh_text_take(&w.text);
}

static const char full[] =
    "plan: 1\n"
    "title: Proton form factors\n"
    "notes: first pass\n"
    "beam: {particle: electron, kinetic_energy: 855 MeV, momentum_spread: 0.02 %,\n"
    "  current: 20.0 ± 0.2 uA, fraction: 60 %, others: {muon-: 35 %}, spot: {x: 0.2 mm},\n"
    "  limits: {current: 100 uA, power: 50 kW}}\n"
    "targets:\n"
    "  - name: hydrogen\n"
    "    layers: [{material: aluminium, thickness: 0.127 mm, role: window},\n"
    "      {material: liquid-hydrogen, thickness: 50 mm, density_loss: 0.02 %/uA}]\n"
    "    wall: {radius: 30 mm, material: aluminium, thickness: 0.13 mm}\n"
    "    empty_target: {share: best}\n"
    "arms:\n"
    "  - {name: A, in_plane: ±28 mrad, out_of_plane: ±70 mrad, bins: 4, momentum_bite: ±5 %,\n"
    "     exit: [{material: kapton, thickness: 0.1 mm}], pointing: 0 ± 0.2 mrad}\n"
    "  - {name: R, ring: {from: 20 deg, to: 30 deg}, edges: [20 deg, 22 deg, 30 deg]}\n"
    "models: {structure: {1H: kelly-2004}}\n"
    "every_setting: {arm: A, goal: 0.5 %}\n"
    "settings:\n"
    "  - {name: K1, q2: 0.6 GeV2, central_momentum: 700 MeV/c}\n"
    "  - {name: K2, angle: {from: 30 deg, to: 60 deg, step: 10 deg}}\n"
    "  - {name: K3, arm: R, time: 2 h, beam: {particle_rate: 3e5 /s, momentum: 600 MeV/c}}\n"
    "  - {name: K4, angle: 30 deg, charge: 1 C, beam: {particle: 12C, kinetic_energy: 30 MeV/u,\n"
    "     charge: 4}, tilt: 10 deg}\n"
    "  - {name: K5, angle: 30 deg, counts: 1000}\n"
    "schedule: {available: 14 d, tasks: [{name: optics, time: 8 h, every: 5 d}]}\n";

static char *changed(const char *plan, const char *from, const char *to)
{
    bh_text t = {0};
    const char *at = strstr(plan, from);
    ck_assert_ptr_nonnull(at);
    bh_text_append_bytes(&t, plan, (size_t)(at - plan));
    bh_text_append(&t, to);
    bh_text_append(&t, at + strlen(from));
    return bh_text_take(&t);
}

/* Sweeps are written out, angles that follow from q2 stand beside it: taken away before reading. */
START_TEST(reads_back)
{
    char *plan = changed(full, "  - {name: K4, angle: 30 deg", "  - {name: K4, angle: 3 deg");
    struct read r = read_text(plan, NULL, 0);
    if (!r.plan)
        read_print(&r);
    ck_assert_ptr_nonnull(r.plan);
    char *first = dump(r.plan);
    char *angle = strstr(first, "name: \"K1\", arms: [{arm: \"A\", angle: \"");
    ck_assert_ptr_nonnull(angle);
    angle = strstr(angle, "angle: ");
    const char *behind = strstr(angle, "q2: ");
    memmove(angle, behind, strlen(behind) + 1);
    for (char *dot; (dot = strstr(first, "name: \"K2.")) != NULL;)
        dot[9] = '-';
    struct read again = read_text(first, NULL, 0);
    if (!again.plan)
        read_print(&again);
    ck_assert_ptr_nonnull(again.plan);
    ck_assert_uint_eq(again.plan->setting_count, r.plan->setting_count);
    for (size_t i = 0; i < r.plan->setting_count; i++) {
        const bh_setting *a = &r.plan->settings[i], *b = &again.plan->settings[i];
        ck_assert_double_eq(a->beam.kinetic_energy.value, b->beam.kinetic_energy.value);
        ck_assert_double_eq(a->beam.particle_rate.value, b->beam.particle_rate.value);
        ck_assert_double_eq(a->tilt.value, b->tilt.value);
        ck_assert_uint_eq(a->arm_count, b->arm_count);
        ck_assert_int_eq(a->arms[0].want, b->arms[0].want);
        ck_assert_double_eq(a->arms[0].wanted.value, b->arms[0].wanted.value);
        ck_assert_double_eq(a->arms[0].angle.value, b->arms[0].angle.value);
    }
    free(first);
    free(plan);
    read_free(&again);
    read_free(&r);
}
END_TEST

static const char *const held[] = {
    "plan: 1",
    "title: \"Proton form factors\"",
    "current: \"20 ± 0.2 uA\"",
    "others: {muon-: \"35 %\"}",
    "duty_factor: \"100 %\"",
    "limits: {current: \"100 uA\", power: \"50 kW\"}",
    "scatterer: \"H\"",
    "empty_target: {share: \"best\"}",
    "in_plane: {from: \"-28 mrad\", to: \"28 mrad\"}",
    "edges: [\"20 deg\", \"22 deg\", \"30 deg\"]",
    "efficiency: \"100 %\"",
    "dead_time_model: \"non-paralysable\"",
    "structure: {1H: \"kelly-2004\"}",
    "radiative: \"default\"",
    "name: \"K2.4\", arms: [{arm: \"A\", angle: \"60 deg\", goal: \"0.5 %\"",
    "every: \"5 d\", beam: \"needed\"",
    "contingency: \"0 %\"",
    "week: \"7 d\"",
    "charge: 4",
    "counts: 1000",
};

START_TEST(holds_values_and_defaults)
{
    char *plan = changed(full, "  - {name: K4, angle: 30 deg", "  - {name: K4, angle: 3 deg");
    struct read r = read_text(plan, NULL, 0);
    ck_assert_ptr_nonnull(r.plan);
    char *all = dump(r.plan);
    ck_assert_msg(strstr(all, held[_i]) != NULL, "no %s in\n%s", held[_i], all);
    free(all);
    free(plan);
    read_free(&r);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("dump");
    tcase_add_test(tests, reads_back);
    tcase_add_loop_test(tests, holds_values_and_defaults, 0, COUNT(held));
    return run_suite("dump", tests);
}
