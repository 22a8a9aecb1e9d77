/* test_heating.c - heat of beams in layers and how hot foils get, against worked examples. */
#include "../suite.h"

#include <math.h>

#include "beamhours/matter/heating.h"
#include "beamhours/units/constants.h"

#define ck_assert_close(got, wanted, tolerance, what)                                            \
    ck_assert_msg(fabs((got) - (wanted)) <= (tolerance)*fabs(wanted), "%s: %.10g, wanted %.10g", \
                  (what), (double)(got), (double)(wanted))

static const double per_uA = 1e-6 / BH_ELEMENTARY; /* singly charged particles per second */

START_TEST(a_microampere_times_a_megavolt_is_a_watt)
{
    ck_assert_close(bh_heating_power(per_uA, 1), 1.0, 1e-12, "RCNP, note on heat by beams");
}
END_TEST

/* Published cells: what the loss gives, and within 15 % what was published. */
static const struct {
    const char *source;
    double current, kinetic, length, density; /* uA MeV cm g/cm3 */
    double computed, tolerance, published;    /* W */
} cells[] = {
    {"SAMPLE target, nucl-ex/9602002: 40 cm of liquid hydrogen; 4.3596 MeV cm2/g (Berger and "
     "Seltzer)",
     40, 200, 40, 0.0708, 493.85, 3e-3, 500},
    {"G0 target, nucl-ex/0502019: 20 cm of liquid hydrogen; 4.7726 MeV cm2/g (Berger and Seltzer), "
     "windows and pump are in what was published",
     40, 3000, 20, 0.0723, 276.05, 3e-3, 320},
};

static const bh_material *hydrogen(bh_material_library **library, bh_diags *diags)
{
    static const char *const folders[] = {"materials", NULL};
    *library = bh_material_library_new(folders);
    return bh_material_find(*library, "liquid-hydrogen", (bh_mark){0}, "material", diags);
}

START_TEST(published_cells)
{
    bh_material_library *library;
    bh_diags *diags = bh_diags_new();
    bh_particle electron;
    const bh_material *material = hydrogen(&library, diags);
    ck_assert(bh_particle_find("electron", &electron));
    const double lost = bh_heating_lost(&electron, material, cells[_i].density, cells[_i].kinetic,
                                        cells[_i].density * cells[_i].length);
    const double power = bh_heating_power(cells[_i].current * per_uA, lost);
    ck_assert_close(power, cells[_i].computed, cells[_i].tolerance, cells[_i].source);
    ck_assert_close(power, cells[_i].published, 0.15, cells[_i].source);
    bh_material_library_free(library);
    bh_diags_free(diags);
}
END_TEST

START_TEST(no_more_than_all_of_it_and_nothing_in_vacuum)
{
    static const char *const folders[] = {"materials", NULL};
    static const char *const beams[] = {"electron", "muon-", "proton", "alpha", "12C"};
    bh_material_library *library = bh_material_library_new(folders);
    bh_diags *diags = bh_diags_new();
    const bh_mark at = {0};
    const bh_material *gold = bh_material_find(library, "gold", at, "material", diags);
    const bh_material *none = bh_material_find(library, "vacuum", at, "material", diags);
    for (int i = 0; i < COUNT(beams); i++) {
        bh_particle p;
        ck_assert(bh_particle_find(beams[i], &p));
        ck_assert_double_eq(bh_heating_lost(&p, gold, 0, 3, 1e6), 3);
        ck_assert_double_gt(bh_heating_lost(&p, gold, 0, 300, 1e-3), 0);
        ck_assert_double_eq(bh_heating_lost(&p, none, 0, 3, 1), 0);
    }
    bh_material_library_free(library);
    bh_diags_free(diags);
}
END_TEST

/* 10 um of aluminium in a frame of 10 mm radius, 0.05 W in a spot of 1.5 mm. */
static const bh_heated_foil foil = {.power = 0.05,
                                    .spot = 0.15,
                                    .edge = 1,
                                    .thickness = 1e-3,
                                    .conductivity = 2.37,
                                    .emissivity = 0.1,
                                    .cold = 300};

/* k t r T' = -(heat inside r) / 2 pi, integrated inwards in small steps. */
START_TEST(conduction_solves_the_heat_equation)
{
    enum { STEPS = 200000 };
    double rise = 0;
    for (int i = 0; i < STEPS; i++) {
        const double r = (i + 0.5) / STEPS * foil.edge;
        const double inside = foil.power * fmin(1, r * r / (foil.spot * foil.spot));
        rise += inside / (2 * BH_PI * foil.conductivity * foil.thickness * r) * foil.edge / STEPS;
    }
    ck_assert_close(bh_heating_conduction(&foil), rise, 1e-6, "integrated");
    ck_assert_close(bh_heating_conduction(&foil), 8.0488, 1e-4, "worked example");
}
END_TEST

START_TEST(radiation_balances_the_heat)
{
    const double sigma = 5.670374419e-8; /* W/m2/K4 */
    const double hot = bh_heating_radiation(&foil), area = 2 * BH_PI * 1.5e-3 * 1.5e-3;
    ck_assert_close(area * 0.1 * sigma * (pow(hot, 4) - pow(300, 4)), 0.05, 1e-9, "balance");
}
END_TEST

START_TEST(the_cooler_way_counts)
{
    bh_heated_foil f = foil;
    ck_assert_close(bh_heating_temperature(&f), 308.0488, 1e-6, "conduction");
    f.conductivity = 0;
    ck_assert(isinf(bh_heating_conduction(&f)));
    ck_assert_double_eq(bh_heating_temperature(&f), bh_heating_radiation(&f));
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("heating");
    tcase_add_test(t, a_microampere_times_a_megavolt_is_a_watt);
    tcase_add_loop_test(t, published_cells, 0, COUNT(cells));
    tcase_add_test(t, no_more_than_all_of_it_and_nothing_in_vacuum);
    tcase_add_test(t, conduction_solves_the_heat_equation);
    tcase_add_test(t, radiation_balances_the_heat);
    tcase_add_test(t, the_cooler_way_counts);
    return run_suite("heating", t);
}
