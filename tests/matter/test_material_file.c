/* test_material_file.c - what is wrong inside a material's file is said where it stands. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/matter/composition.h"
#include "beamhours/matter/hazard.h"
#include "beamhours/matter/material_file.h"
#include "beamhours/matter/material_keys.h"

static bh_arena *arena;
static bh_diags *diags;
static bh_material m;

static void open_all(void)
{
    arena = bh_arena_new();
    diags = bh_diags_new();
    ck_assert(arena && diags);
}

static void close_all(void)
{
    bh_arena_free(arena);
    bh_diags_free(diags);
}

static bh_code read_text(const char *text)
{
    const bh_material_source source = {text, strlen(text), "mine", "mine.yaml"};
    return bh_material_read(&source, arena, diags, &m);
}

static bool was_said(bh_severity severity, const char *key, const char *text, int line)
{
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        if (d->severity == severity && strcmp(d->key, key) == 0 && strstr(d->text, text) &&
            d->at.line == line && strcmp(d->at.file, "mine.yaml") == 0)
            return true;
    }
    return false;
}

static void show(const char *wanted)
{
    (void)fprintf(stderr, "wanted: %s\n", wanted);
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        (void)fprintf(stderr, "  %d:%d: %s: %s\n", d->at.line, d->at.column, d->key, d->text);
    }
}

#define HEAD  "material: 1\nsummary: \"x\"\nstate: solid\n"
#define GAS   "material: 1\nsummary: \"x\"\nstate: gas\n"
#define SOLID HEAD "formula: {C: 1}\ndensity: 2 g/cm3\n"

static const struct {
    const char *text, *key, *said;
    int line;
} bad[] = {
    {SOLID "densty: 2 g/cm3\n", "densty", "did you mean density?", 6},
    {HEAD "formula: {C: 1}\n", "density", "missing in a material", 1},
    {HEAD "density: 2 g/cm3\n", "plan", "none of formula, atoms and weights", 1},
    {HEAD "density: 2 g/cm3\nformula: {C: 1}\nweights: {C: 100 %}\n", "weights", "exclude", 6},
    {HEAD "density: 2\nformula: {C: 1}\n", "density", "2", 4},
    {HEAD "density: 0 g/cm3\nformula: {C: 1}\n", "density", "more than 0 g/cm3", 4},
    {HEAD "density: 2 cm\nformula: {C: 1}\n", "density", "g/cm3", 4},
    {HEAD "density: 2 g/cm3\nformula: {Xq: 1}\n", "formula", "neither an element nor a nuclide", 5},
    {HEAD "density: 2 g/cm3\nformula: {Pb208: 1}\n", "formula", "did you mean 208Pb?", 5},
    {HEAD "density: 2 g/cm3\nformula: {Tc: 1}\n", "formula", "nature has no Tc", 5},
    {HEAD "density: 2 g/cm3\nformula: {40C: 1}\n", "formula", "40C is not in the table", 5},
    {HEAD "density: 2 g/cm3\nformula: {Og: 1}\n", "formula", "name another element", 5},
    {HEAD "density: 2 g/cm3\nformula: {1n: 1}\n", "formula", "neither an element nor", 5},
    {HEAD "density: 2 g/cm3\nformula: {C: -1}\n", "formula.C", "too small", 5},
    {HEAD "density: 2 g/cm3\nformula: {C: one}\n", "formula.C", "not a number", 5},
    {HEAD "density: 2 g/cm3\nformula: {}\n", "formula", "empty", 5},
    {HEAD "density: 2 g/cm3\nweights: {Fe: 70 %, Ni: 29 %}\n", "weights", "add up to 99.0000 %", 5},
    {HEAD "density: 2 g/cm3\natoms: {6Li: 95 %, 7Li: 5.06 %}\n", "atoms", "add up to 100.060 %", 5},
    {HEAD "density: 2 g/cm3\natoms: {6Li: 0.95, 7Li: 5 %}\n", "atoms.6Li", "0.95", 5},
    {SOLID "temperature: 300 K\n", "temperature", "only a gas has temperature", 6},
    {SOLID "molecule: 2\n", "molecule", "only a gas has molecule", 6},
    {GAS "formula: {H: 1}\ndensity: 8.4e-5 g/cm3\n", "pressure", "missing in a material", 1},
    {GAS "molecule: 0.5\n", "molecule", "too small", 4},
    {"material: 1\nsummary: \"x\"\nstate: vacuum\ndensity: 1 g/cm3\n", "density", "vacuum has no",
     4},
    {"material: 1\nsummary: \"x\"\nstate: vacuum\nformula: {H: 1}\n", "state", "vacuum has no", 3},
    {"material: 2\nsummary: \"x\"\nstate: vacuum\n", "material", "too large", 1},
    {"material: 1\nsummary: \"x\"\nstate: sold\n", "state", "did you mean solid?", 3},
    {SOLID "hazards: [led]\n", "hazards.1", "did you mean lead?", 6},
    {SOLID "hazards: lead\n", "hazards", "list", 6},
    {SOLID "sources: {densiti: \"x\"}\n", "sources.densiti", "did you mean density?", 6},
    {SOLID "density_effect: {density: 2 g/cm3}\n", "density_effect.c", "missing", 6},
    {SOLID "mean_excitation: 78 V\n", "mean_excitation", "V", 6},
    {"state: [", "plan", "", 1},
};

START_TEST(errors_say_where_and_what)
{
    ck_assert_int_eq(read_text(bad[_i].text), BH_EPLAN);
    if (!was_said(BH_SEVERITY_ERROR, bad[_i].key, bad[_i].said, bad[_i].line) &&
        strcmp(bad[_i].text, "state: [") != 0)
        show(bad[_i].said);
    ck_assert(strcmp(bad[_i].text, "state: [") == 0 ||
              was_said(BH_SEVERITY_ERROR, bad[_i].key, bad[_i].said, bad[_i].line));
}
END_TEST

START_TEST(all_errors_at_once)
{
    ck_assert_int_eq(read_text("material: 1\nstate: gas\nformula: {Xq: 1, Tc: 1}\nmeltin: 2 K\n"),
                     BH_EPLAN);
    /* summary, density, temperature, pressure, molecule, two names, one key */
    ck_assert_uint_eq(bh_diags_errors(diags), 8);
}
END_TEST

START_TEST(good_file)
{
    ck_assert_int_eq(read_text(HEAD "weights: {Fe: 70.02 %, Ni: 30 %}\ndensity: 8 g/cm3\n"
                                    "melting: 1400 degC\nconductivity: 16 W/m/K\n"
                                    "hazards: [toxic]\nsources: {density: \"guess\"}\n"),
                     BH_OK);
    ck_assert_uint_eq(bh_diags_count(diags), 0);
    ck_assert_str_eq(m.name, "mine");
    ck_assert_double_eq_tol(m.melting, 1673.15, 1e-9);
    ck_assert_double_eq_tol(m.conductivity, 0.16, 1e-12);
    ck_assert_str_eq(m.hazards[0], "toxic");
    ck_assert_str_eq(m.sources[0], "density: guess");
    ck_assert_uint_eq(m.source_count, 1);
    ck_assert_double_eq(m.effect.density, 0);
    double sum = 0;
    for (size_t i = 0; i < m.count; i++)
        sum += m.parts[i].per_atom;
    ck_assert_double_eq_tol(sum, 1, 1e-14); /* the slack is divided among all */
}
END_TEST

START_TEST(named_twice_is_added)
{
    /* Heavy water of 50 %: the 2H of natural hydrogen joins the 2H that is named. */
    ck_assert_int_eq(read_text("material: 1\nsummary: \"x\"\nstate: liquid\n"
                               "formula: {H: 1, 2H: 1, O: 1}\ndensity: 1.05 g/cm3\n"),
                     BH_OK);
    ck_assert_uint_eq(m.count, 5);
    ck_assert_int_eq(m.parts[1].a, 2);
    ck_assert(!m.parts[1].natural && m.parts[0].natural);
    ck_assert_double_eq_tol(m.parts[0].per_atom + m.parts[1].per_atom, 2.0 / 3, 1e-12);
    ck_assert(m.parts[1].per_atom > m.parts[0].per_atom);
}
END_TEST

static const struct {
    const char *text, *key, *said;
    int line;
} odd[] = {
    /* The mean excitation energy of water that one table lists beside another one's C. */
    {"material: 1\nsummary: \"x\"\nstate: liquid\nformula: {H: 2, O: 1}\ndensity: 1 g/cm3\n"
     "mean_excitation: 79.7 eV\ndensity_effect: {density: 1 g/cm3, c: 3.5017, x0: 0.2400, "
     "x1: 2.8004, a: 0.09116, k: 3.4773, delta0: 0}\n",
     "density_effect.c", "belong to c = 3.6233", 7},
    /* A lost sign of x0. */
    {"material: 1\nsummary: \"x\"\nstate: solid\nformula: {Ni: 1}\ndensity: 8.902 g/cm3\n"
     "mean_excitation: 311 eV\ndensity_effect: {density: 8.902 g/cm3, c: 4.3115, x0: 0.0566, "
     "x1: 3.1851, a: 0.16496, k: 2.8430, delta0: 0.10}\n",
     "density_effect.a", "the signs", 7},
    /* kg/m3 taken for g/cm3 */
    {GAS "formula: {He: 1}\ndensity: 0.166 g/cm3\ntemperature: 293.15 K\n"
         "pressure: 101.325 kPa\nmolecule: 1\n",
     "density", "0.0001664 g/cm3", 5},
};

START_TEST(doubtful_values_are_warned_of)
{
    ck_assert_int_eq(read_text(odd[_i].text), BH_OK);
    if (!was_said(BH_SEVERITY_WARNING, odd[_i].key, odd[_i].said, odd[_i].line))
        show(odd[_i].said);
    ck_assert(was_said(BH_SEVERITY_WARNING, odd[_i].key, odd[_i].said, odd[_i].line));
    ck_assert_uint_eq(bh_diags_count(diags), 1);
}
END_TEST

START_TEST(plans_are_told_from_materials)
{
    static const struct {
        const char *text;
        bool material;
    } rows[] = {{"material: 1\n", true},
                {"# a comment\n\n   \r\n# another\nmaterial : 1\n", true},
                {"\xef\xbb\xbfmaterial: 1", true},
                {"materials: 1\n", false},
                {"plan: 1\nmaterial: gold\n", false},
                {"material", false},
                {"# material: 1", false},
                {"", false}};
    for (int i = 0; i < COUNT(rows); i++)
        ck_assert_msg(bh_material_is_file(rows[i].text, strlen(rows[i].text)) == rows[i].material,
                      "row %d", i);
}
END_TEST

/* Every key of the table is explained in the manual of the format. */
START_TEST(every_key_is_documented)
{
    static char text[20000];
    FILE *f = fopen("docs/materials.md", "r");
    ck_assert_msg(f != NULL, "run the tests in the top folder");
    text[fread(text, 1, sizeof text - 1, f)] = '\0';
    (void)fclose(f);
    for (size_t i = 0; i < bh_material_schema.count; i++) {
        char quoted[64];
        const char *name = bh_material_schema.keys[i].name;
        (void)snprintf(quoted, sizeof quoted, "`%s`", name);
        char line[64];
        (void)snprintf(line, sizeof line, "\n%s:", name);
        ck_assert_msg(strstr(text, quoted) || strstr(text, line), "%s", name);
    }
    for (int h = 0; h < BH_HAZARD_COUNT; h++)
        ck_assert_msg(strstr(text, bh_hazard_words[h]) != NULL, "%s", bh_hazard_words[h]);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("material_file");
    tcase_add_checked_fixture(tests, open_all, close_all);
    tcase_add_loop_test(tests, errors_say_where_and_what, 0, COUNT(bad));
    tcase_add_test(tests, all_errors_at_once);
    tcase_add_test(tests, good_file);
    tcase_add_test(tests, named_twice_is_added);
    tcase_add_loop_test(tests, doubtful_values_are_warned_of, 0, COUNT(odd));
    tcase_add_test(tests, plans_are_told_from_materials);
    tcase_add_test(tests, every_key_is_documented);
    return run_suite("material_file", tests);
}
