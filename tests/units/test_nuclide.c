/* test_nuclide.c - every row of the table against its published input; names and suggestions. */
#include "../suite.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

static const char csv[] = "src/units/nuclides.csv";

/* One line of the input: numbers as the file has them, empty fields as 0. */
typedef struct {
    int z, a, twice_spin;
    char symbol[4];
    double u, mass, share_2020, share_1997, radius, radius_sigma;
} row;

static int read_row(char *line, row *out)
{
    char *field[11], nothing[] = "";
    int n = 0;
    for (int i = 0; i < 11; i++)
        field[i] = nothing;
    for (size_t length; n < 11; n++, line += length + 1) {
        length = strcspn(line, ",\n");
        field[n] = line;
        if (line[length] == '\0')
            break;
        line[length] = '\0';
    }
    *out = (row){.z = atoi(field[0]), .a = atoi(field[1]), .twice_spin = atoi(field[10])};
    (void)snprintf(out->symbol, sizeof out->symbol, "%s", field[2]);
    out->u = strtod(field[3], NULL);
    out->mass = strtod(field[5], NULL);
    out->share_2020 = strtod(field[6], NULL);
    out->share_1997 = strtod(field[7], NULL);
    out->radius = strtod(field[8], NULL);
    out->radius_sigma = strtod(field[9], NULL);
    return n;
}

static FILE *open_rows(char line[256])
{
    FILE *f = fopen(csv, "r");
    ck_assert_msg(f != NULL, "run the tests in the top folder: no %s", csv);
    while (fgets(line, 256, f) && (line[0] == '#' || line[0] == 'Z'))
        ;
    return f;
}

static void compare(const row *want, const bh_nuclide *got)
{
    const char *source = "AME2020, Angeli & Marinova 2013, NUBASE2020 (see nuclides.csv)";
    ck_assert_msg(got != NULL, "%d%s missing", want->a, want->symbol);
    const double off = got->mass / want->mass - 1.0;
    ck_assert_msg(fabs(off) < 2e-9, "%s: mass off by %g; %s", got->name, off, source);
    ck_assert_msg(got->atomic_mass == want->u, "%s: %.12g u; %s", got->name, want->u, source);
    ck_assert_double_eq(got->radius, want->radius);
    ck_assert_double_eq(got->radius_sigma, want->radius_sigma);
    ck_assert_int_eq(got->twice_spin, want->twice_spin);
    ck_assert_int_eq(got->twice_spin % 2, got->a % 2);
    const int older = want->z == 3 || want->z == 5 || (want->z == 73 && want->a == 180);
    const double share = (older ? want->share_1997 : want->share_2020) / 100;
    ck_assert_msg(fabs(got->abundance - share) <= 7e-5 * share, "%s: abundance %g, not %g; %s",
                  got->name, got->abundance, share, source);
}

START_TEST(every_row_is_as_published)
{
    char line[256];
    FILE *f = open_rows(line);
    size_t rows = 0;
    do {
        row want;
        ck_assert_int_eq(read_row(line, &want), 11);
        const bh_nuclide *got = bh_nuclide_find(want.z, want.a);
        compare(&want, got);
        char name[8];
        (void)snprintf(name, sizeof name, "%d%s", want.a, want.symbol);
        ck_assert_str_eq(got->name, name);
        rows++;
    } while (fgets(line, sizeof line, f));
    (void)fclose(f);
    ck_assert_uint_eq(rows, bh_nuclide_table_size);
    ck_assert_uint_eq(rows, 327);
}
END_TEST

START_TEST(the_table_is_what_its_generator_makes)
{
    FILE *made = popen("LC_ALL=C awk -f src/units/nuclides.awk src/units/nuclides.csv", "r");
    FILE *kept = fopen("src/units/nuclide_table.c", "r");
    ck_assert(made != NULL && kept != NULL);
    char a[512], b[512];
    int line = 0;
    while (fgets(b, sizeof b, kept)) {
        line++;
        ck_assert_ptr_nonnull(fgets(a, sizeof a, made));
        ck_assert_msg(strcmp(a, b) == 0, "nuclide_table.c:%d is not what nuclides.awk makes", line);
    }
    ck_assert_int_gt(line, 330);
    ck_assert_ptr_null(fgets(a, sizeof a, made));
    ck_assert_int_eq(pclose(made), 0);
    (void)fclose(kept);
}
END_TEST

START_TEST(abundances_of_an_element_add_up)
{
    int elements = 0;
    for (int z = 1; z <= 118; z++) {
        size_t count;
        const bh_nuclide *isotope = bh_element_isotopes(z, &count);
        double sum = 0.0;
        for (size_t i = 0; i < count; i++) {
            ck_assert_int_eq(isotope[i].z, z);
            sum += isotope[i].abundance;
        }
        ck_assert_msg(sum == 0.0 || fabs(sum - 1.0) < 1e-12, "%s: %.15g", bh_element_symbol(z),
                      sum);
        elements += sum > 0.0;
    }
    ck_assert_int_eq(elements, 84); /* 80 with a stable isotope, and Bi, Th, Pa, U */
}
END_TEST

/* Standard atomic weights, Prohaska et al., Pure Appl. Chem. 94 (2022) 573, from memory. */
static const struct {
    const char *symbol;
    double weight, within;
} weights[] = {
    {"H", 1.008, 2e-4},     {"Li", 6.94, 2e-3},    {"B", 10.81, 2e-3},      {"C", 12.011, 1e-3},
    {"O", 15.999, 1e-3},    {"Al", 26.9815, 1e-4}, {"Fe", 55.845, 2e-3},    {"Cu", 63.546, 3e-3},
    {"Sn", 118.710, 7e-3},  {"W", 183.84, 1e-2},   {"Au", 196.96657, 1e-5}, {"Pb", 207.2, 0.1},
    {"U", 238.02891, 3e-5},
};

START_TEST(mean_masses_are_the_atomic_weights)
{
    const double mass = bh_element_mass(bh_element_z(weights[_i].symbol));
    ck_assert_msg(fabs(mass - weights[_i].weight) <= weights[_i].within,
                  "%s: %.6f u, not %.6f; IUPAC, from memory", weights[_i].symbol, mass,
                  weights[_i].weight);
}
END_TEST

START_TEST(elements_without_abundance_have_no_mean_mass)
{
    size_t count = 7;
    ck_assert_double_eq(bh_element_mass(bh_element_z("Tc")), 0.0);
    ck_assert_double_eq(bh_element_mass(0), 0.0);
    ck_assert_double_eq(bh_element_mass(-3), 0.0);
    ck_assert_ptr_null(bh_element_isotopes(118, &count));
    ck_assert_uint_eq(count, 0);
    ck_assert_ptr_null(bh_element_isotopes(0, NULL));
    ck_assert_ptr_nonnull(bh_element_isotopes(50, NULL));
    ck_assert_ptr_null(bh_nuclide_find(6, 99));
    ck_assert_ptr_null(bh_nuclide_find(-1, 1));
    ck_assert_ptr_null(bh_nuclide_find(200, 300));
}
END_TEST

START_TEST(light_masses_are_those_of_codata)
{
    ck_assert_double_eq(bh_nuclide_find(1, 1)->mass, BH_MASS_PROTON);
    ck_assert_double_eq(bh_nuclide_find(0, 1)->mass, BH_MASS_NEUTRON);
    ck_assert_double_eq(bh_nuclide_find(2, 4)->mass, BH_MASS_ALPHA);
}
END_TEST

static const struct {
    const char *name;
    int z, a;
} good[] = {
    {"1H", 1, 1}, {"208Pb", 82, 208}, {"12C", 6, 12},     {"Pb", 82, 0},  {"H", 1, 0},
    {"1n", 0, 1}, {"U", 92, 0},       {"252Cf", 98, 252}, {"99C", 6, 99}, {"294Og", 118, 294},
};
static const char *const bad[] = {"",     "Xx",    "208",    "0H",      "012C",  "12c",
                                  "pb",   "PB",    "5C",     "300U",    "n",     "0n",
                                  "2n",   "12C ",  " 12C",   "12 C",    "-1H",   "C12",
                                  "12CC", "1000U", "99999U", "neutron", "208Pbx"};

START_TEST(names_read_and_write_the_same)
{
    int z = -7, a = -7;
    char name[8];
    ck_assert_msg(bh_nuclide_parse(good[_i].name, &z, &a), "%s", good[_i].name);
    ck_assert_int_eq(z, good[_i].z);
    ck_assert_int_eq(a, good[_i].a);
    ck_assert_str_eq(bh_nuclide_name(z, a, name), good[_i].name);
}
END_TEST

START_TEST(other_words_are_no_nuclides)
{
    int z = -7, a = -7;
    ck_assert_msg(!bh_nuclide_parse(bad[_i], &z, &a), "%s", bad[_i]);
    ck_assert_int_eq(z, -7);
    ck_assert_int_eq(a, -7);
}
END_TEST

START_TEST(symbols_and_names_have_ends)
{
    char name[8];
    for (int z = 1; z <= 118; z++)
        ck_assert_int_eq(bh_element_z(bh_element_symbol(z)), z);
    ck_assert_ptr_null(bh_element_symbol(0));
    ck_assert_ptr_null(bh_element_symbol(119));
    ck_assert_int_eq(bh_element_z(""), 0);
    ck_assert_str_eq(bh_nuclide_name(119, 300, name), "?");
    ck_assert_str_eq(bh_nuclide_name(0, 2, name), "?");
    ck_assert_str_eq(bh_nuclide_name(6, -4, name), "C");
    ck_assert_str_eq(bh_nuclide_name(6, 1000, name), "C");
}
END_TEST

static const struct {
    const char *wrote, *meant;
} spellings[] = {
    {"Pb208", "208Pb"}, {"208-Pb", "208Pb"}, {"208 Pb", "208Pb"}, {"c-12", "12C"}, {"H1", "1H"},
    {"12c", "12C"},     {"PB208", "208Pb"},  {"^12C", "12C"},     {"C", "12C"},    {"au", "197Au"},
    {"Pb", "208Pb"},    {"he_4", "4He"},     {"C99", NULL},       {"", NULL},      {"12", NULL},
    {"lead", NULL},     {"C12x", NULL},      {"12C4", NULL},      {"Og", NULL},    {"n", NULL},
    {"Xq3", NULL},      {"D", "2H"},         {"T", "3H"},
};

START_TEST(unusual_spellings_are_understood)
{
    const bh_nuclide *n = bh_nuclide_suggest(spellings[_i].wrote);
    if (spellings[_i].meant)
        ck_assert_msg(n && strcmp(n->name, spellings[_i].meant) == 0, "%s -> %s, not %s",
                      spellings[_i].wrote, n ? n->name : "nothing", spellings[_i].meant);
    else
        ck_assert_msg(n == NULL, "%s -> %s", spellings[_i].wrote, n ? n->name : "");
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("nuclide");
    tcase_add_test(tests, every_row_is_as_published);
    tcase_add_test(tests, the_table_is_what_its_generator_makes);
    tcase_add_test(tests, abundances_of_an_element_add_up);
    tcase_add_loop_test(tests, mean_masses_are_the_atomic_weights, 0, COUNT(weights));
    tcase_add_test(tests, elements_without_abundance_have_no_mean_mass);
    tcase_add_test(tests, light_masses_are_those_of_codata);
    tcase_add_loop_test(tests, names_read_and_write_the_same, 0, COUNT(good));
    tcase_add_loop_test(tests, other_words_are_no_nuclides, 0, COUNT(bad));
    tcase_add_test(tests, symbols_and_names_have_ends);
    tcase_add_loop_test(tests, unusual_spellings_are_understood, 0, COUNT(spellings));
    return run_suite("units/nuclide", tests);
}
