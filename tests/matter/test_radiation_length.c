/* test_radiation_length.c - radiation lengths and the shape of soft bremsstrahlung. */
#include "passing.h"

#include "beamhours/matter/radiation_length.h"
#include "beamhours/units/nuclide.h"

static void row(char *f[])
{
    const bh_material m = material_of(f[0]);
    const bh_radiation_length x = bh_radiation_length_of(&m);
    /* Masses of another year, lead most. */
    NEAR(x.computed, atof(f[1]), 1e-4, "%s; Tsai, Rev. Mod. Phys. 46 (1974) 815", f[0]);
    NEAR(x.computed, atof(f[2]), 6e-4, "%s; Particle Data Group, rounded", f[0]);
    NEAR(x.b, atof(f[3]), 1e-5, "%s, b; Tsai 1974", f[0]);
    ck_assert_double_eq(x.value, x.published > 0.0 ? x.published : x.computed);
}

START_TEST(published)
{
    ck_assert_int_eq(each_row("tests/matter/radiation_lengths.csv", row, 4), 42);
}
END_TEST

/* Tissue: weights of ICRP (from memory), radiation length of the Particle Data Group 2020, read:
 * atomic and nuclear properties, soft tissue (ICRP). */
START_TEST(many_elements)
{
    const struct {
        int z;
        double weight;
    } of[] = {{1, 0.104472},  {6, 0.232190},  {7, 0.024880},  {8, 0.630238},  {11, 0.001130},
              {12, 0.000130}, {15, 0.001330}, {16, 0.001990}, {17, 0.001340}, {19, 0.001990},
              {20, 0.000230}, {26, 0.000050}, {30, 0.000030}};
    bh_constituent parts[COUNT(of)] = {{0}};
    double atoms = 0.0;
    for (int i = 0; i < COUNT(of); i++)
        atoms += of[i].weight / bh_element_mass(of[i].z);
    for (int i = 0; i < COUNT(of); i++)
        parts[i] = (bh_constituent){.z = of[i].z,
                                    .per_atom = of[i].weight / bh_element_mass(of[i].z) / atoms};
    const bh_material tissue = {.count = COUNT(of), .parts = parts, .mean_atomic_mass = 1 / atoms};
    const bh_radiation_length x = bh_radiation_length_of(&tissue);
    NEAR(x.computed, 37.63, 6e-4, "soft tissue");
    ck_assert_double_eq(x.value, x.computed);
    ck_assert_double_eq(x.published, 0.0);
}
END_TEST

/* Elements by themselves: Tsai 1974 with 1/12, computed independently. */
START_TEST(soft_spectrum)
{
    const struct {
        const char *name;
        double b;
    } rows[] = {{"hydrogen-gas", 1.352734718}, {"graphite", 1.356489931},
                {"aluminium", 1.358453113},    {"copper", 1.360646096},
                {"tungsten", 1.364999119},     {"lead", 1.36578363}};
    for (int i = 0; i < COUNT(rows); i++) {
        const bh_material m = material_of(rows[i].name);
        NEAR(bh_radiation_length_of(&m).b, rows[i].b, 1e-5, "%s; Tsai 1974", rows[i].name);
    }
}
END_TEST

START_TEST(nothing)
{
    const bh_material vacuum = material_of("vacuum");
    const bh_radiation_length x = bh_radiation_length_of(&vacuum);
    ck_assert_double_eq(x.value, 0.0);
    ck_assert_double_eq(x.computed, 0.0);
    ck_assert_double_eq(bh_radiation_strength(0), 0.0);
    ck_assert_double_eq(bh_radiation_strength(119), 0.0);
    ck_assert_double_gt(bh_radiation_strength(118), bh_radiation_strength(92));
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("radiation length");
    tcase_add_checked_fixture(t, open_library, close_library);
    tcase_add_test(t, published);
    tcase_add_test(t, many_elements);
    tcase_add_test(t, soft_spectrum);
    tcase_add_test(t, nothing);
    return run_suite("radiation length", t);
}
