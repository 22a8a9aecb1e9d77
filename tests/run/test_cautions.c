/* test_cautions.c - each plan gets the cautions that follow from it, and each defers to the
 * facility. */
#include "../suite.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/run/cautions.h"

static bh_arena *arena;
static const bh_caution *list;
static size_t count;

static void open_all(void)
{
    arena = bh_arena_new();
    ck_assert_ptr_nonnull(arena);
}

static void close_all(void)
{
    bh_arena_free(arena);
}

static bh_mark line(int n)
{
    return (bh_mark){"plan.yaml", n, 5};
}

static bh_beam electrons(double mev, double microamperes)
{
    bh_beam beam = {.at = line(4)};
    ck_assert(bh_particle_find("electron", &beam.particle));
    beam.charge = -1;
    beam.kinetic_energy = (bh_value){.value = mev, .given = true, .at = line(5)};
    beam.current = (bh_value){.value = microamperes * 1e-6, .given = true, .at = line(6)};
    beam.particle_rate = (bh_value){.value = microamperes * 1e-6 / 1.602176634e-19, .at = line(3)};
    return beam;
}

static bh_beam counted(const char *particle, double mev, double per_second)
{
    bh_beam beam = electrons(mev, 0);
    ck_assert(bh_particle_find(particle, &beam.particle));
    beam.rate_written = true;
    beam.particle_rate = (bh_value){.value = per_second, .given = true, .at = line(6)};
    return beam;
}

static const bh_caution *about(const char *words)
{
    for (size_t i = 0; i < count; i++)
        if (strstr(list[i].text, words))
            return &list[i];
    return NULL;
}

/* What every caution must and must not say. */
static void derive(const bh_plan *plan)
{
    static const char *const never[] = {" safe ", "harmless", "no danger", "Sv",
                                        "shield", "!",        "Gy"};
    list = bh_cautions_from_plan(plan, arena, &count);
    ck_assert_ptr_nonnull(list);
    ck_assert_uint_ge(count, 1);
    for (size_t i = 0; i < count; i++) {
        const char *text = list[i].text;
        static const char end[] = ", its rules and licensed practice decide.";
        ck_assert(strlen(text) > sizeof end && strlen(list[i].key) > 0);
        ck_assert_str_eq(text + strlen(text) - (sizeof end - 1), end);
        ck_assert_msg(strstr(text, "The facility's ") != NULL, "%s", text);
        ck_assert_msg(list[i].at.line > 0, "%s", text);
        for (int n = 0; n < COUNT(never); n++)
            ck_assert_msg(!strstr(text, never[n]), "%s", text);
        int sentences = 0;
        for (const char *p = text; (p = strstr(p, ". ")) != NULL; p++)
            sentences++;
        ck_assert_msg(sentences == 1, "%s", text);
    }
}

static void expect(const char *words, const char *key, int at)
{
    const bh_caution *c = about(words);
    ck_assert_msg(c != NULL, "no caution says \"%s\"", words);
    ck_assert_str_eq(c->key, key);
    ck_assert_int_eq(c->at.line, at);
}

static bh_material solid(const char *name)
{
    return (bh_material){.name = name, .state = BH_STATE_SOLID};
}

/* ---- beams ---- */

START_TEST(power_of_the_beam)
{
    static const struct {
        double mev, microamperes;
        const char *power, *effect;
    } rows[] = {{855, 20, "Beam of up to 17.1 kW:", "melts"},
                {1450, 0.0251, "Beam of up to 36.4 W:", "heats and activates"},
                {80, 700, "Beam of up to 56.0 kW:", "melts"},
                {2000, 1000, "Beam of up to 2.00 MW:", "melts"},
                {855, 1e-4, "Beam of up to 85.5 mW:", "may activate"},
                {855, 1e-6, "Beam of up to 855 uW:", "may activate"},
                {1, 1e-9, "Beam of up to 1.00 nW:", "may activate"},
                {1, 1e-12, "Beam of up to 0.00100 nW:", "may activate"}};
    for (int i = 0; i < COUNT(rows); i++) {
        const bh_plan plan = {.beam = electrons(rows[i].mev, rows[i].microamperes)};
        derive(&plan);
        ck_assert_uint_eq(count, 1);
        expect(rows[i].power, "beam.current", 6);
        ck_assert_msg(about(rows[i].effect) != NULL, "%s", list[0].text);
    }
}
END_TEST

START_TEST(strongest_setting_counts)
{
    bh_setting settings[3] = {{.name = "K1"}, {.name = "K2"}, {.name = "K3"}};
    settings[0].beam = electrons(855, 20);
    settings[1].beam = electrons(855, 100);
    settings[1].beam.current.at = line(40);
    settings[2].beam = electrons(400, 20);
    bh_plan plan = {.beam = electrons(855, 20), .settings = settings, .setting_count = 3};
    derive(&plan);
    expect("85.5 kW", "settings.K2.beam.current", 40);
    plan.setting_count = 1;
    derive(&plan);
    expect("17.1 kW", "beam.current", 6);
}
END_TEST

START_TEST(sealed_sources)
{
    static const struct {
        const char *particle;
        double mev, per_second;
        bool source;
    } rows[] = {{"alpha", 5, 2.5e3, true},    {"electron", 1, 1e5, true},
                {"alpha", 50, 2.5e3, false},  {"alpha", 5, 1e12, false},
                {"electron", 20, 1e5, false}, {"proton", 3, 1e3, false}};
    for (int i = 0; i < COUNT(rows); i++) {
        const bh_plan plan = {.beam = counted(rows[i].particle, rows[i].mev, rows[i].per_second)};
        derive(&plan);
        ck_assert_uint_eq(count, 1);
        ck_assert_msg((about("radioactive source") != NULL) == rows[i].source, "row %d: %s", i,
                      list[0].text);
        ck_assert_str_eq(list[0].key, "beam.particle_rate");
        ck_assert_int_eq(list[0].at.line, 6);
    }
    bh_plan plan = {.beam = counted("alpha", 5, 2.5e3)};
    plan.beam.rate_written = false; /* a current is an accelerator's */
    derive(&plan);
    ck_assert_ptr_null(about("radioactive source"));
}
END_TEST

START_TEST(secondary_beams)
{
    bh_plan plan = {.beam = counted("muon-", 94, 3e5)};
    derive(&plan);
    expect("secondary", "beam.particle", 4);
    bh_setting settings[2] = {{.name = "K1"}, {.name = "K2"}};
    settings[0].beam = electrons(855, 20);
    settings[1].beam = counted("pion+", 300, 1e6);
    settings[1].beam.at = line(50);
    plan = (bh_plan){.beam = electrons(855, 20), .settings = settings, .setting_count = 2};
    derive(&plan);
    expect("beam of pion+", "beam.particle", 50);
    plan.setting_count = 1;
    derive(&plan);
    ck_assert_ptr_null(about("secondary"));
}
END_TEST

/* ---- materials ---- */

START_TEST(hydrogen_behind_thin_windows)
{
    const char *const words[] = {"flammable-gas", "cryogen", "oxygen-displacing"};
    bh_material hydrogen = {.name = "liquid-hydrogen", .state = BH_STATE_LIQUID};
    hydrogen.hazards = words;
    hydrogen.hazard_count = 3;
    const bh_material aluminium = solid("aluminium");
    const bh_layer layers[] = {
        {.material = &aluminium, .thickness = {.value = 0.0127}, .at = line(10)},
        {.material = &hydrogen, .thickness = {.value = 9}, .at = line(11)},
        {.material = &aluminium, .thickness = {.value = 0.0127}, .at = line(12)}};
    const bh_target target = {.name = {.text = "hydrogen"}, .layers = layers, .layer_count = 3};
    const bh_plan plan = {.beam = electrons(855, 20), .targets = &target, .target_count = 1};
    derive(&plan);
    ck_assert_uint_eq(count, 3);
    expect("liquid-hydrogen: flammable", "targets.hydrogen.layers", 11);
    expect("burns skin", "targets.hydrogen.layers", 11);
    expect("place of oxygen", "targets.hydrogen.layers", 11);
    expect("Thin windows such as this one of aluminium", "targets.hydrogen.layers", 10);
}
END_TEST

/* One target of one solid with one hazard word. */
static void derive_word(const char *word)
{
    bh_material material = solid("stuff");
    material.hazards = &word;
    material.hazard_count = 1;
    const bh_layer layer = {.material = &material, .thickness = {.value = 0.01}, .at = line(11)};
    const bh_target target = {.name = {.text = "T"}, .layers = &layer, .layer_count = 1};
    const bh_plan plan = {.beam = electrons(450, 20), .targets = &target, .target_count = 1};
    derive(&plan);
}

START_TEST(every_hazard_word_has_a_caution)
{
    static const char *const rows[][2] = {{"flammable-gas", "explosive mixture"},
                                          {"flammable", "hot surfaces"},
                                          {"cryogen", "burns skin"},
                                          {"oxygen-displacing", "confined space"},
                                          {"oxidising", "feeds fire"},
                                          {"water-reactive", "keep it dry"},
                                          {"beryllium", "lungs"},
                                          {"lead", "lead is toxic"},
                                          {"uranium", "accounted for by law"},
                                          {"toxic", "swallowed"},
                                          {"radioactive", "before any beam"}};
    for (int i = 0; i < COUNT(rows); i++) {
        derive_word(rows[i][0]);
        ck_assert_uint_eq(count, 2);
        expect(rows[i][1], "targets.T.layers", 11);
        ck_assert_ptr_nonnull(about("stuff: "));
    }
}
END_TEST

START_TEST(materials_of_one_hazard_are_named_together)
{
    const char *const word = "lead";
    bh_material pure = solid("lead-208");
    bh_material natural = solid("lead");
    pure.hazards = natural.hazards = &word;
    pure.hazard_count = natural.hazard_count = 1;
    const bh_layer layers[] = {{.material = &pure, .at = line(10)},
                               {.material = &natural, .at = line(11)},
                               {.material = NULL},
                               {.material = &natural, .at = line(12)}};
    const bh_target targets[] = {
        {.name = {.text = "A"}, .layers = layers, .layer_count = 4},
        {.name = {.text = "B"}, .wall = {.material = &pure, .at = line(20)}, .has_wall = true}};
    const bh_plan plan = {.beam = electrons(450, 20), .targets = targets, .target_count = 2};
    derive(&plan);
    ck_assert_uint_eq(count, 2);
    expect("lead-208, lead: lead is toxic", "targets.A.layers", 10);
}
END_TEST

/* Equal sets of hazards share a caution; a set that is only partly equal has its own. */
START_TEST(each_set_of_hazards_has_one_caution)
{
    const char *const both[] = {"lead", "radioactive"};
    const char *const one[] = {"lead"};
    bh_material old = solid("old-lead"), hot = solid("hot-lead"), hotter = solid("hotter-lead");
    old.hazards = one;
    old.hazard_count = 1;
    hot.hazards = hotter.hazards = both;
    hot.hazard_count = hotter.hazard_count = 2;
    const bh_layer layers[] = {{.material = &hot, .at = line(10)},
                               {.material = &old, .at = line(11)},
                               {.material = &hotter, .at = line(12)}};
    const bh_target target = {.name = {.text = "A"}, .layers = layers, .layer_count = 3};
    const bh_plan plan = {.beam = electrons(450, 20), .targets = &target, .target_count = 1};
    derive(&plan);
    ck_assert_uint_eq(count, 3);
    expect("hot-lead, hotter-lead: lead is toxic", "targets.A.layers", 10);
    ck_assert_ptr_nonnull(strstr(about("hot-lead, hotter")->text, "; radioactive before any beam"));
    expect("old-lead: lead is toxic as dust or on the hands, and melts early. The facility",
           "targets.A.layers", 11);
}
END_TEST

START_TEST(walls_and_exits_count)
{
    const char *const word = "beryllium";
    bh_material beryllium = solid("beryllium");
    beryllium.hazards = &word;
    beryllium.hazard_count = 1;
    const bh_target target = {
        .name = {.text = "B"}, .wall = {.material = &beryllium, .at = line(20)}, .has_wall = true};
    const bh_material air = {
        .name = "air",
        .state = BH_STATE_GAS,
        .pressure = 101325,
        .count = 2,
        .parts = (const bh_constituent[]){{.z = 7, .per_atom = 0.78}, {.z = 8, .per_atom = 0.22}}};
    const bh_layer exits[] = {
        {.material = &beryllium, .thickness = {.value = 0.01}, .at = line(30)},
        {.material = &air, .thickness = {.value = 20}, .at = line(31)}};
    const bh_arm arm = {.name = {.text = "A"}, .exit = exits, .exit_count = 2};
    bh_plan plan = {.beam = electrons(450, 20), .targets = &target, .target_count = 1};
    derive(&plan);
    expect("lungs", "targets.B.wall", 20);
    ck_assert_ptr_null(about("Thin windows"));
    plan = (bh_plan){.beam = electrons(450, 20), .arms = &arm, .arm_count = 1};
    derive(&plan);
    expect("lungs", "arms.A.exit", 30);
    expect("Thin windows", "arms.A.exit", 30);
    ck_assert_ptr_null(about("air:"));
}
END_TEST

START_TEST(gas_under_pressure)
{
    const bh_constituent helium = {.z = 2, .a = 3, .per_atom = 1};
    const bh_material gas = {.name = "helium-3-gas",
                             .state = BH_STATE_GAS,
                             .pressure = 101325,
                             .count = 1,
                             .parts = &helium};
    bh_layer layers[2] = {{.material = &gas, .at = line(10)}, {.material = &gas, .at = line(11)}};
    const bh_target target = {.name = {.text = "T"}, .layers = layers, .layer_count = 2};
    const bh_plan plan = {.beam = electrons(450, 20), .targets = &target, .target_count = 1};
    derive(&plan);
    ck_assert_ptr_null(about("pressure vessel"));
    expect("place of oxygen", "targets.T.layers", 10);
    layers[0].pressure = (bh_value){.value = 3e5, .given = true, .at = line(14)};
    layers[1].pressure = (bh_value){.value = 1e6, .given = true, .at = line(15)};
    derive(&plan);
    expect("helium-3-gas at 10.0 bar is a pressure vessel", "targets.T.layers", 15);
}
END_TEST

START_TEST(magnets)
{
    bh_arm arms[3] = {{.name = {.text = "A"}}, {.name = {.text = "B"}}, {.name = {.text = "C"}}};
    const bh_plan plan = {.beam = electrons(450, 20), .arms = arms, .arm_count = 3};
    derive(&plan);
    ck_assert_ptr_null(about("magnets"));
    arms[0].momentum_bite = (bh_extent){.given = true, .at = line(20)};
    derive(&plan);
    expect("Arm A has magnets:", "arms.A", 20);
    arms[0].momentum_bite.given = false;
    arms[1].momentum_range = (bh_extent){.given = true, .at = line(21)};
    arms[2].momentum_resolution = (bh_value){.given = true, .at = line(22)};
    derive(&plan);
    expect("Arm B has magnets:", "arms.B", 21);
}
END_TEST

/* From the text of a plan and the library that is shipped: marks and keys are the reader's own. */
START_TEST(from_a_plan_as_written)
{
    static const char text[] =
        "plan: 1\nbeam:\n  particle: electron\n  kinetic_energy: 855 MeV\n  current: 20 uA\n"
        "target:\n  scatterer: H\n  empty_target: {share: 10 %}\n  layers:\n"
        "    - {material: aluminum, thickness: 0.1 mm, role: window}\n"
        "    - {material: liquid-hydrogen, thickness: 5 cm}\n"
        "arms:\n  - {name: A, solid_angle: 6 msr, momentum_bite: ±5 %}\n"
        "settings:\n  - {name: K1, angle: 25 deg, time: 1 h}\n"
        "  - {name: K2, angle: 25 deg, time: 1 h, beam: {current: 40 uA}}\n";
    const char *const folders[] = {"plans", "materials", NULL};
    bh_material_library *library = bh_material_library_new(folders);
    bh_diags *diags = bh_diags_new();
    bh_plan *plan = bh_plan_read(text, sizeof text - 1, "p.yaml", NULL, 0, library, diags);
    ck_assert_msg(plan != NULL, "%s", bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "");
    derive(plan);
    ck_assert_uint_eq(count, 5);
    expect("34.2 kW", "settings.K2.beam.current", 16);
    expect("the beam leaves about", "target.layers", 10);
    expect("liquid-hydrogen: flammable", "target.layers", 11);
    expect("burns skin", "target.layers", 11);
    expect("this one of aluminium", "target.layers", 10);
    expect("Arm A has magnets", "arms.A", 13);
    bh_plan_free(plan);
    bh_diags_free(diags);
    bh_material_library_free(library);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("cautions");
    tcase_add_checked_fixture(tests, open_all, close_all);
    tcase_add_test(tests, power_of_the_beam);
    tcase_add_test(tests, strongest_setting_counts);
    tcase_add_test(tests, sealed_sources);
    tcase_add_test(tests, secondary_beams);
    tcase_add_test(tests, hydrogen_behind_thin_windows);
    tcase_add_test(tests, every_hazard_word_has_a_caution);
    tcase_add_test(tests, materials_of_one_hazard_are_named_together);
    tcase_add_test(tests, each_set_of_hazards_has_one_caution);
    tcase_add_test(tests, walls_and_exits_count);
    tcase_add_test(tests, gas_under_pressure);
    tcase_add_test(tests, magnets);
    tcase_add_test(tests, from_a_plan_as_written);
    return run_suite("cautions", tests);
}
