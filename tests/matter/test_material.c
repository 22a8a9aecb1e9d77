/* test_material.c - every material of the library against published values; how one is found. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#include "beamhours/matter/material.h"
#include "beamhours/units/nuclide.h"

static const char *const shipped[] = {"materials", NULL};
static const bh_mark here = {"plan.yaml", 7, 3};

static bh_material_library *library;
static bh_diags *diags;
static char folder[64]; /* of its own for each test */

static void open_all(void)
{
    library = bh_material_library_new(shipped);
    diags = bh_diags_new();
    (void)snprintf(folder, sizeof folder, "/tmp/beamhours-test-XXXXXX");
    ck_assert(library && diags && mkdtemp(folder));
}

static void close_all(void)
{
    char command[128];
    (void)snprintf(command, sizeof command, "rm -rf %s", folder);
    ck_assert_int_eq(system(command), 0);
    bh_material_library_free(library);
    bh_diags_free(diags);
}

static void put(const char *name, const char *text)
{
    char path[256];
    (void)snprintf(path, sizeof path, "%s/%s", folder, name);
    FILE *f = fopen(path, "w");
    ck_assert(f && fputs(text, f) >= 0 && fclose(f) == 0);
}

static const bh_material *find(const char *name)
{
    return bh_material_find(library, name, here, "target.material", diags);
}

static const bh_material *must_find(const char *name)
{
    const bh_material *m = find(name);
    ck_assert_msg(m != NULL, "%s: %s", name,
                  bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "not found");
    return m;
}

static void expect_last(const char *text)
{
    const size_t n = bh_diags_count(diags);
    ck_assert(n > 0);
    const bh_diag *last = bh_diags_at(diags, n - 1);
    ck_assert_msg(strstr(last->text, text) != NULL, "\"%s\" lacks \"%s\"", last->text, text);
}

static double z_over_a(const bh_material *m)
{
    double z = 0;
    for (size_t i = 0; i < m->count; i++)
        z += m->parts[i].per_atom * m->parts[i].z;
    return z / m->mean_atomic_mass;
}

/* ---- all of them ---- */

START_TEST(every_file_loads_without_complaint)
{
    size_t count;
    const char *const *names = bh_material_names(library, &count);
    ck_assert_uint_ge(count, 65);
    for (size_t i = 0; i < count; i++) {
        const bh_material *m = must_find(names[i]);
        ck_assert_str_eq(m->name, names[i]);
        ck_assert_msg(bh_diags_count(diags) == 0, "%s:%d: %s: %s", m->file,
                      bh_diags_at(diags, 0)->at.line, bh_diags_at(diags, 0)->key,
                      bh_diags_at(diags, 0)->text);
        ck_assert(strlen(m->summary) > 0);
        ck_assert(i == 0 || strcmp(names[i - 1], names[i]) < 0);
    }
}
END_TEST

static void check_parts(const bh_material *m)
{
    double sum = 0;
    double mass = 0;
    for (size_t i = 0; i < m->count; i++) {
        const bh_constituent *p = &m->parts[i];
        const bh_nuclide *n = bh_nuclide_find(p->z, p->a);
        ck_assert(n && p->per_atom > 0 && p->mass == n->mass);
        ck_assert(i == 0 || p[-1].z != p->z || p[-1].a < p->a);
        sum += p->per_atom;
        mass += p->per_atom * n->atomic_mass;
    }
    ck_assert_msg(fabs(sum - 1) < 1e-12, "%s: shares add up to %.15g", m->name, sum);
    ck_assert_double_eq_tol(m->mean_atomic_mass, mass, 1e-9);
}

START_TEST(compositions_add_up)
{
    size_t count;
    const char *const *names = bh_material_names(library, &count);
    for (size_t i = 0; i < count; i++) {
        const bh_material *m = must_find(names[i]);
        if (m->state == BH_STATE_VACUUM)
            continue;
        ck_assert_msg(m->count > 0 && m->density > 0, "%s", m->name);
        ck_assert_msg(m->effect.mean_excitation > 0 && m->effect.density > 0, "%s", m->name);
        check_parts(m);
    }
}
END_TEST

static bool has_source(const bh_material *m, const char *key)
{
    const size_t length = strlen(key);
    for (size_t i = 0; i < m->source_count; i++)
        if (strncmp(m->sources[i], key, length) == 0 && m->sources[i][length] == ':' &&
            strlen(m->sources[i]) > length + 4)
            return true;
    return false;
}

START_TEST(every_value_has_a_source)
{
    size_t count;
    const char *const *names = bh_material_names(library, &count);
    for (size_t i = 0; i < count; i++) {
        const bh_material *m = must_find(names[i]);
        const struct {
            const char *key;
            bool given;
        } values[] = {{"density", m->density > 0},
                      {"mean_excitation", m->effect.mean_excitation > 0},
                      {"density_effect", m->effect.density > 0},
                      {"radiation_length", m->published_x0 > 0},
                      {"melting", m->melting > 0},
                      {"boiling", m->boiling > 0},
                      {"conductivity", m->conductivity > 0},
                      {"hazards", m->hazard_count > 0}};
        size_t given = 0;
        for (int v = 0; v < COUNT(values); v++) {
            ck_assert_msg(has_source(m, values[v].key) == values[v].given, "%s: %s", m->name,
                          values[v].key);
            given += values[v].given;
        }
        const int composed =
            has_source(m, "formula") + has_source(m, "atoms") + has_source(m, "weights");
        ck_assert_msg(composed == (m->count > 0), "%s: composition", m->name);
        ck_assert_uint_eq(m->source_count, given + (m->count > 0));
    }
}
END_TEST

/* ---- published values ---- */

/* Compared with what the file says: exact but for its rounding; Z/A depends on the isotopes' masses
 * and abundances, which are of another year than the published ones. */
static void compare(const char *name, const double v[11], const char *source)
{
    const bh_material *m = must_find(name);
    const bh_density_effect *e = &m->effect;
    const struct {
        const char *what;
        double got, want, tolerance;
    } checks[] = {{"density", m->density, v[0], 1e-4},
                  {"Z/A", z_over_a(m), v[1], 2.5e-4},
                  {"I", e->mean_excitation * 1e6, v[2], 1e-4},
                  {"C", e->c, v[3], 1e-6},
                  {"x0", e->x0, v[4], 1e-6},
                  {"x1", e->x1, v[5], 1e-6},
                  {"a", e->a, v[6], 1e-6},
                  {"k", e->k, v[7], 1e-6},
                  {"delta0", e->delta0, v[8], 1e-6},
                  {"density of the set", e->density, v[9], 1e-4}};
    for (int i = 0; i < COUNT(checks); i++)
        ck_assert_msg(fabs(checks[i].got - checks[i].want) <=
                          checks[i].tolerance * fabs(checks[i].want) + 1e-12,
                      "%s: %s %.6g, not %.6g; %s", name, checks[i].what, checks[i].got,
                      checks[i].want, source);
    if (m->published_x0 > 0)
        ck_assert_msg(fabs(m->published_x0 / v[10] - 1) < 6e-4, "%s: X0 %.5g, not %.5g; %s", name,
                      m->published_x0, v[10], "Tsai, Rev. Mod. Phys. 46 (1974) 815");
}

START_TEST(published_values)
{
    FILE *f = fopen("tests/matter/materials.csv", "r");
    ck_assert_msg(f != NULL, "run the tests in the top folder");
    char line[400];
    int rows = 0;
    while (fgets(line, sizeof line, f)) {
        if (line[0] == '#' || strncmp(line, "material,", 9) == 0)
            continue;
        char *rest = strchr(line, ',');
        *rest++ = '\0';
        double v[11];
        for (int i = 0; i < COUNT(v); i++, rest++)
            v[i] = strtod(rest, &rest);
        rest[strcspn(rest, "\n")] = '\0';
        compare(line, v, rest);
        rows++;
    }
    (void)fclose(f);
    ck_assert_int_eq(rows, 48);
}
END_TEST

START_TEST(gases_are_nearly_ideal)
{
    size_t count;
    int gases = 0;
    const char *const *names = bh_material_names(library, &count);
    for (size_t i = 0; i < count; i++) {
        const bh_material *m = must_find(names[i]);
        if (m->state != BH_STATE_GAS)
            continue;
        const double ideal = bh_material_gas_density(m, m->temperature, m->pressure);
        /* Carbon dioxide's compressibility at 20 degC is 0.995, from memory. */
        const double tolerance = strcmp(m->name, "carbon-dioxide") == 0 ? 7e-3 : 5e-3;
        ck_assert_msg(fabs(m->density / ideal - 1) < tolerance, "%s: %g, ideal %g", m->name,
                      m->density, ideal);
        gases++;
    }
    ck_assert_int_ge(gases, 12);
}
END_TEST

START_TEST(gas_density_follows_temperature_and_pressure)
{
    const bh_material *he3 = must_find("helium-3-gas");
    /* 10 amagat: 0.446149 mol/l of an ideal gas at 273.15 K and 10.1325 bar; CODATA 2022. */
    ck_assert_double_eq_tol(bh_material_gas_density(he3, 273.15, 1013250), 0.446150e-3 * 3.0160293,
                            1e-8);
    ck_assert_double_eq(bh_material_gas_density(he3, 0, 1e5), 0);
    ck_assert_double_eq(bh_material_gas_density(he3, 300, -1), 0);
    ck_assert_double_eq(bh_material_gas_density(he3, (double)NAN, 1e5), 0);
    ck_assert_double_eq(bh_material_gas_density(must_find("gold"), 300, 1e5), 0);
    ck_assert_double_eq(bh_material_gas_density(NULL, 300, 1e5), 0);
    ck_assert_double_eq_tol(must_find("hydrogen-gas")->molar_mass, 2.016, 5e-4);
}
END_TEST

/* ---- nuclides ---- */

START_TEST(shares_of_nuclides)
{
    static const struct {
        const char *material;
        int z, a;
        double per_atom, tolerance;
        bool natural;
        const char *source;
    } rows[] = {
        {"liquid-hydrogen", 1, 1, 0.99987, 3e-5, true, "Rosman and Taylor, IUPAC 1997"},
        {"liquid-deuterium", 1, 2, 1, 0, false, "definition"},
        {"lead", 82, 208, 0.524, 1e-9, true, "Rosman and Taylor, IUPAC 1997"},
        {"lead-208", 82, 208, 1, 0, false, "definition"},
        {"gold", 79, 197, 1, 0, true, "only stable isotope"},
        {"lithium", 3, 6, 0.0759, 1e-9, true, "Rosman and Taylor, IUPAC 1997"},
        {"polyethylene", 6, 12, 0.9893 / 3, 1e-4, true, "CH2 and IUPAC 1997"},
        {"kapton", 7, 14, 2 / 39. * 0.99632, 1e-5, true, "C22H10N2O5 and IUPAC 1997"},
        {"deuterated-ammonia", 1, 2, 0.75, 1e-12, false, "ND3"},
        /* 63 g copper of 63.546 and 37 g zinc of 65.38 (65.40 by these abundances) */
        {"brass", 29, 63, 0.6917 * (63 / 63.546) / (63 / 63.546 + 37 / 65.4), 2e-4, true,
         "weights and IUPAC 1997"},
        {"havar", 4, 9, 0.0031993, 1e-6, true, "0.05 % by weight, standard atomic weights"},
    };
    for (int r = 0; r < COUNT(rows); r++) {
        const bh_material *m = must_find(rows[r].material);
        double found = 0;
        bool natural = false;
        for (size_t i = 0; i < m->count; i++)
            if (m->parts[i].z == rows[r].z && m->parts[i].a == rows[r].a) {
                found = m->parts[i].per_atom;
                natural = m->parts[i].natural;
            }
        ck_assert_msg(fabs(found - rows[r].per_atom) <= rows[r].tolerance, "%s: %d %d is %.8g; %s",
                      m->name, rows[r].z, rows[r].a, found, rows[r].source);
        ck_assert_msg(natural == rows[r].natural, "%s", m->name);
    }
}
END_TEST

START_TEST(most_frequent_element_first)
{
    const bh_material *water = must_find("water");
    ck_assert_int_eq(water->parts[0].z, 1);
    ck_assert_int_eq(water->parts[0].a, 1);
    ck_assert_int_eq(water->parts[water->count - 1].a, 18);
    ck_assert_int_eq(must_find("lithium-fluoride")->parts[0].z, 3); /* equal shares: by Z */
    ck_assert_int_eq(must_find("havar")->parts[0].z, 27);
}
END_TEST

START_TEST(vacuum_is_nothing)
{
    const bh_material *m = must_find("vacuum");
    ck_assert_int_eq(m->state, BH_STATE_VACUUM);
    ck_assert_uint_eq(m->count, 0);
    ck_assert_double_eq(m->density, 0);
}
END_TEST

/* ---- finding ---- */

START_TEST(found_once_and_kept)
{
    const bh_material *first = must_find("aluminium");
    ck_assert_ptr_eq(find("aluminium"), first);
    ck_assert_ptr_eq(find("aluminum"), first);
    ck_assert_ptr_eq(find("materials/aluminium.yaml"), NULL); /* below materials/ */
    ck_assert_str_eq(must_find("aluminum-7075")->name, "aluminium-7075");
    ck_assert_str_eq(must_find("sulfur")->name, "sulphur");
    ck_assert_str_eq(must_find("cesium-iodide")->name, "caesium-iodide");
    ck_assert_str_eq(first->file, "materials/aluminium.yaml");
}
END_TEST

START_TEST(unknown_names_get_suggestions)
{
    static const struct {
        const char *name, *answer;
    } rows[] = {{"LH2", "did you mean liquid-hydrogen?"},
                {"Pb208", "did you mean lead-208?"},
                {"aluminiun", "did you mean aluminium?"},
                {"unobtainium-x", "`beamhours materials` lists them"},
                {"../materials/gold", "a path ending in .yaml would do"},
                {"", "there is no material"}};
    for (int r = 0; r < COUNT(rows); r++) {
        ck_assert_ptr_null(find(rows[r].name));
        expect_last(rows[r].answer);
        const bh_diag *d = bh_diags_at(diags, bh_diags_count(diags) - 1);
        ck_assert_str_eq(d->at.file, here.file);
        ck_assert_int_eq(d->at.line, here.line);
        ck_assert_str_eq(d->key, "target.material");
    }
    ck_assert_uint_eq(bh_diags_errors(diags), COUNT(rows));
}
END_TEST

static const char mine[] = "material: 1\nsummary: \"Mine\"\nstate: solid\n"
                           "formula: {C: 1}\ndensity: 2 g/cm3\n";

/* The library of the folder of this test, then the shipped one. */
static void open_mine(void)
{
    const char *const folders[] = {folder, "/nowhere", "materials", NULL};
    bh_material_library_free(library);
    library = bh_material_library_new(folders);
    ck_assert_ptr_nonnull(library);
}

START_TEST(folders_in_order)
{
    put("gold.yaml", mine);
    put("my-own.yaml", mine);
    put("lead.yaml", "plan: 1\ntitle: \"no material, but a plan of that name\"\n");
    put("notes.txt", "no yaml");
    open_mine();
    ck_assert_str_eq(must_find("gold")->summary, "Mine");
    ck_assert_str_eq(must_find("my-own")->summary, "Mine");
    ck_assert_str_eq(must_find("my-own.yaml")->name, "my-own.yaml");
    ck_assert_str_eq(must_find("lead")->file, "materials/lead.yaml");
    ck_assert_str_eq(must_find("silver")->file, "materials/silver.yaml");
    ck_assert_uint_eq(bh_diags_count(diags), 0);
    size_t all;
    size_t mine_too;
    bh_material_library *other = bh_material_library_new(shipped);
    (void)bh_material_names(other, &all);
    const char *const *names = bh_material_names(library, &mine_too);
    ck_assert_uint_eq(mine_too, all + 1); /* gold twice, the plan not at all */
    ck_assert_ptr_eq(bh_material_names(library, &mine_too), names);
    bh_material_library_free(other);
}
END_TEST

START_TEST(files_that_are_none)
{
    char path[128];
    put("blob.yaml", "# comment\n\nplan: 1\n");
    (void)snprintf(path, sizeof path, "%s/cave.yaml", folder);
    ck_assert_int_eq(mkdir(path, 0700), 0);
    open_mine();
    ck_assert_ptr_null(find("blob"));
    expect_last("blob.yaml is no material");
    ck_assert_ptr_null(find("cave"));
    expect_last("give a file that can be read");
    ck_assert_ptr_null(find("absent.yaml"));
    expect_last("give a file that can be read");
    (void)snprintf(path, sizeof path, "%s/absolute.yaml", folder);
    put("absolute.yaml", mine);
    ck_assert_str_eq(must_find(path)->summary, "Mine");
}
END_TEST

START_TEST(a_broken_file_is_told_of_once)
{
    put("bad.yaml", "material: 1\nsummary: \"Bad\"\nstate: solid\nformula: {C: 1}\n");
    open_mine();
    ck_assert_ptr_null(find("bad"));
    ck_assert_uint_eq(bh_diags_count(diags), 2);
    const bh_diag *d = bh_diags_at(diags, 0);
    ck_assert_ptr_nonnull(strstr(d->at.file, "bad.yaml"));
    ck_assert_int_eq(d->at.line, 1);
    ck_assert_str_eq(d->key, "density");
    expect_last("bad.yaml has errors");
    ck_assert_int_eq(bh_diags_at(diags, 1)->at.line, here.line);
    ck_assert_ptr_null(find("bad"));
    ck_assert_uint_eq(bh_diags_count(diags), 3);
}
END_TEST

START_TEST(no_folders_at_all)
{
    bh_material_library *none = bh_material_library_new(NULL);
    ck_assert_ptr_nonnull(none);
    size_t count = 9;
    ck_assert_ptr_nonnull(bh_material_names(none, &count));
    ck_assert_uint_eq(count, 0);
    ck_assert_ptr_null(bh_material_find(none, "gold", here, "k", diags));
    ck_assert_ptr_nonnull(bh_material_find(none, "materials/gold.yaml", here, "k", diags));
    bh_material_library_free(none);
    bh_material_library_free(NULL);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("material");
    tcase_add_checked_fixture(tests, open_all, close_all);
    tcase_set_timeout(tests, 60);
    tcase_add_test(tests, every_file_loads_without_complaint);
    tcase_add_test(tests, compositions_add_up);
    tcase_add_test(tests, every_value_has_a_source);
    tcase_add_test(tests, published_values);
    tcase_add_test(tests, gases_are_nearly_ideal);
    tcase_add_test(tests, gas_density_follows_temperature_and_pressure);
    tcase_add_test(tests, shares_of_nuclides);
    tcase_add_test(tests, most_frequent_element_first);
    tcase_add_test(tests, vacuum_is_nothing);
    tcase_add_test(tests, found_once_and_kept);
    tcase_add_test(tests, unknown_names_get_suggestions);
    tcase_add_test(tests, folders_in_order);
    tcase_add_test(tests, files_that_are_none);
    tcase_add_test(tests, a_broken_file_is_told_of_once);
    tcase_add_test(tests, no_folders_at_all);
    return run_suite("material", tests);
}
