/* test_medium.c - electrons of materials; elements' excitation energies; particles in flight. */
#include "passing.h"

#include "beamhours/units/constants.h"

/* The list of elements was written from memory: every material of one element that was read from a
 * publication must agree. */
START_TEST(elements_agree_with_materials)
{
    size_t count;
    const char *const *names = bh_material_names(library, &count);
    int compared = 0;
    for (size_t i = 0; i < count; i++) {
        if (strcmp(names[i], "vacuum") == 0 || strcmp(names[i], "liquid-hydrogen") == 0 ||
            strcmp(names[i], "liquid-deuterium") == 0) /* bound: 21.8 eV */
            continue;
        const bh_medium m = medium_of(names[i]);
        if (m.count != 1)
            continue;
        NEAR(m.mean_excitation, bh_element_excitation(m.elements[0].z), 1e-6, "%s", names[i]);
        compared++;
    }
    ck_assert_int_ge(compared, 50);
    ck_assert_double_eq(bh_element_excitation(0), 0.0);
    ck_assert_double_eq(bh_element_excitation(93), 0.0);
}
END_TEST

START_TEST(shares_and_electrons)
{
    const bh_medium m = medium_of("water");
    ck_assert_uint_eq(m.count, 2);
    double sum = 0.0;
    for (size_t i = 0; i < m.count; i++)
        sum += m.elements[i].per_atom;
    NEAR(sum, 1.0, 1e-12, "shares");
    NEAR(m.z_over_a, 0.55509, 2e-4, "Z/A; Particle Data Group 2018");
    ck_assert(m.set_published);
}
END_TEST

/* ---- density effect ---- */

/* ESTAR's delta (Sternheimer, Berger and Seltzer 1982, exact theory), read; the fit is good to 0.1
 * there. */
START_TEST(delta)
{
    const struct {
        const char *material;
        double kinetic, delta; /* MeV */
    } rows[] = {{"hydrogen-gas", 1000.0, 5.577}, {"aluminium", 1.0, 0.3339},
                {"aluminium", 100.0, 6.363},     {"iron", 10.0, 2.652},
                {"lead", 1000.0, 8.986},         {"water", 10.0, 2.992},
                {"copper", 0.5, 0.2958},         {"hydrogen-gas", 1.0, 0.0}};
    for (int i = 0; i < COUNT(rows); i++) {
        const bh_medium m = medium_of(rows[i].material);
        const double tau = rows[i].kinetic / BH_MASS_ELECTRON;
        const double got = bh_medium_density_effect(&m, sqrt(tau * (tau + 2.0)));
        ck_assert_msg(fabs(got - rows[i].delta) < 0.1, "%s at %g MeV: %g, not %g; ESTAR",
                      rows[i].material, rows[i].kinetic, got, rows[i].delta);
    }
}
END_TEST

/* Hydrogen: the set belongs to 0.06 g/cm3; at 0.0708 C = 3.0977, x0 = 0.44, x1 = 1.8856. */
START_TEST(another_density)
{
    const bh_medium m = medium_of("liquid-hydrogen");
    NEAR(m.effect.c, 3.0977, 1e-4, "C");
    NEAR(m.effect.x0, 0.4400, 3e-4, "x0");
    NEAR(m.effect.x1, 1.8856, 1e-4, "x1");
    /* at high energy the density of electrons alone counts: twice as dense, ln 2 more */
    const bh_material h = material_of("liquid-hydrogen");
    bh_medium dense;
    ck_assert_int_eq(bh_medium_of(&h, 2.0 * m.density, &dense, NULL), BH_OK);
    NEAR(bh_medium_density_effect(&dense, 1e4) - bh_medium_density_effect(&m, 1e4), log(2.0), 1e-9,
         "delta");
}
END_TEST

/* The rule for materials without a set, against published sets: delta within 0.5 (lead), so 2 to 3
 * % of a loss. */
START_TEST(general_rule)
{
    static const char *const names[] = {"water",        "copper",       "lead",  "air",
                                        "hydrogen-gas", "helium-gas",   "xenon", "graphite",
                                        "uranium",      "polyethylene", "mylar"};
    for (int i = 0; i < COUNT(names); i++) {
        const bh_material own = material_of(names[i]);
        bh_material bare = own;
        bare.effect = (bh_density_effect){.mean_excitation = own.effect.mean_excitation};
        bh_medium with;
        bh_medium without;
        ck_assert_int_eq(bh_medium_of(&own, 0.0, &with, NULL), BH_OK);
        ck_assert_int_eq(bh_medium_of(&bare, 0.0, &without, NULL), BH_OK);
        ck_assert(with.set_published && !without.set_published);
        for (double bg = 0.5; bg < 1e5; bg *= 1.7)
            ck_assert_msg(fabs(bh_medium_density_effect(&with, bg) -
                               bh_medium_density_effect(&without, bg)) < 0.8,
                          "%s at %g: %g, not %g", names[i], bg,
                          bh_medium_density_effect(&without, bg),
                          bh_medium_density_effect(&with, bg));
    }
}
END_TEST

/* Without I: Bragg's rule.  Water has 75 eV, of which the rule makes 69. */
START_TEST(additive_excitation)
{
    bh_material m = material_of("water");
    m.effect.mean_excitation = 0.0;
    bh_medium out;
    ck_assert_int_eq(bh_medium_of(&m, 0.0, &out, NULL), BH_OK);
    NEAR(out.mean_excitation, exp(0.2 * log(19.2e-6) + 0.8 * log(95e-6)), 1e-9, "Bragg");
}
END_TEST

START_TEST(what_is_refused)
{
    bh_error err;
    bh_medium out = {.count = 7};
    bh_material m = material_of("copper");
    bh_constituent part = {.z = 94, .a = 239, .per_atom = 1.0};
    m.parts = &part;
    m.count = 1;
    ck_assert_int_eq(bh_medium_of(&m, 0.0, &out, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "Z = 94"));
    bh_constituent many[BH_MEDIUM_ELEMENTS + 1];
    for (int i = 0; i < COUNT(many); i++)
        many[i] = (bh_constituent){.z = i + 1, .per_atom = 1.0 / COUNT(many)};
    m.parts = many;
    m.count = COUNT(many);
    ck_assert_int_eq(bh_medium_of(&m, 0.0, &out, &err), BH_EDOMAIN);
    ck_assert_ptr_nonnull(strstr(err.text, "more than 24 elements"));
    ck_assert_int_eq(bh_medium_of(&m, (double)NAN, &out, &err), BH_EDOMAIN);
    ck_assert_uint_eq(out.count, 7); /* untouched */
}
END_TEST

/* ---- flight ---- */

START_TEST(flight)
{
    const bh_particle p = particle_of("proton");
    const bh_flight f = bh_flight_of(&p, 938.27208943);
    NEAR(f.gamma, 2.0, 1e-12, "gamma");
    NEAR(f.beta, sqrt(0.75), 1e-12, "beta");
    NEAR(f.beta_gamma, sqrt(3.0), 1e-12, "beta gamma");
    NEAR(f.momentum, sqrt(3.0) * p.mass, 1e-12, "momentum");
    NEAR(f.transfer, 6.0 * BH_MASS_ELECTRON, 3e-3, "2 m (beta gamma)^2 and a little less");
    ck_assert_double_lt(f.transfer, 6.0 * BH_MASS_ELECTRON);
    const bh_particle e = particle_of("electron");
    const bh_particle positron = particle_of("positron");
    ck_assert_double_eq(bh_flight_of(&e, 10.0).transfer, 5.0);
    ck_assert_double_eq(bh_flight_of(&positron, 10.0).transfer, 10.0);
    const bh_particle muon = particle_of("muon-");
    ck_assert(bh_particle_is_electron(&e) && !bh_particle_is_electron(&muon) &&
              !bh_particle_is_electron(&p));
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("medium");
    tcase_add_checked_fixture(t, open_library, close_library);
    tcase_add_test(t, elements_agree_with_materials);
    tcase_add_test(t, shares_and_electrons);
    tcase_add_test(t, delta);
    tcase_add_test(t, another_density);
    tcase_add_test(t, general_rule);
    tcase_add_test(t, additive_excitation);
    tcase_add_test(t, what_is_refused);
    tcase_add_test(t, flight);
    return run_suite("medium", t);
}
