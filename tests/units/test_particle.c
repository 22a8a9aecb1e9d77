/* test_particle.c - what each named particle is, nuclides as beams, and what wrong names meant. */
#include "../suite.h"

#include <math.h>
#include <string.h>

#include "beamhours/units/constants.h"
#include "beamhours/units/particle.h"

/* Masses and moments: CODATA 2022 (Mohr et al., 2024); moments from memory; pion: Particle Data
 * Group 2022, from memory; 12C, 208Pb: AME2020 less electrons. */
static const struct {
    const char *name, *canonical;
    bh_particle_kind kind;
    int charge, twice_spin, z, a;
    double mass, magnetic;
} rows[] = {
    {"electron", "electron", BH_KIND_LEPTON, -1, 1, 0, 0, 0.51099895069, -1.00115965218046},
    {"positron", "positron", BH_KIND_LEPTON, 1, 1, 0, 0, 0.51099895069, 1.00115965218046},
    {"muon-", "muon-", BH_KIND_LEPTON, -1, 1, 0, 0, 105.6583755, -1.00116592062},
    {"muon+", "muon+", BH_KIND_LEPTON, 1, 1, 0, 0, 105.6583755, 1.00116592062},
    {"pion-", "pion-", BH_KIND_HADRON, -1, 0, 0, 0, 139.57039, 0},
    {"pion+", "pion+", BH_KIND_HADRON, 1, 0, 0, 0, 139.57039, 0},
    {"proton", "proton", BH_KIND_HADRON, 1, 1, 1, 1, 938.27208943, 2.79284734463},
    {"deuteron", "deuteron", BH_KIND_ION, 1, 2, 1, 2, 1875.612945, 1.714025463},
    {"triton", "triton", BH_KIND_ION, 1, 1, 1, 3, 2808.92113668, 8.918170675},
    {"helion", "helion", BH_KIND_ION, 2, 1, 2, 3, 2808.39161112, -6.368307494},
    {"alpha", "alpha", BH_KIND_ION, 2, 0, 2, 4, 3727.3794118, 0},
    {"1H", "proton", BH_KIND_HADRON, 1, 1, 1, 1, 938.27208943, 2.79284734463},
    {"4He", "alpha", BH_KIND_ION, 2, 0, 2, 4, 3727.3794118, 0},
    {"12C", "12C", BH_KIND_ION, 6, 0, 6, 12, 11174.864296, 0},
    {"208Pb", "208Pb", BH_KIND_ION, 82, 0, 82, 208, 193687.691498, 0},
    {"7Li", "7Li", BH_KIND_ION, 3, 3, 3, 7, 6533.833033, 0},
};

START_TEST(a_particle_is_what_it_is)
{
    bh_particle p;
    ck_assert_msg(bh_particle_find(rows[_i].name, &p), "%s", rows[_i].name);
    ck_assert_str_eq(p.name, rows[_i].canonical);
    ck_assert_int_eq(p.kind, rows[_i].kind);
    ck_assert_int_eq(p.charge, rows[_i].charge);
    ck_assert_int_eq(p.twice_spin, rows[_i].twice_spin);
    ck_assert_int_eq(p.z, rows[_i].z);
    ck_assert_int_eq(p.a, rows[_i].a);
    ck_assert_msg(fabs(p.mass / rows[_i].mass - 1) < 2e-9, "%s: %.9f MeV; CODATA 2022", p.name,
                  p.mass);
    ck_assert_msg(fabs(p.magnetic - rows[_i].magnetic) < 1e-8, "%s: moment %.10f; CODATA 2022",
                  p.name, p.magnetic);
}
END_TEST

static const char *const unknown[] = {"",   "e-",  "Electron",  "neutron", "1n",       "C",
                                      "5C", "99C", "electron ", "muon",    "graviton", "12C+"};

START_TEST(other_names_are_refused)
{
    bh_particle p = {.charge = 77};
    ck_assert_msg(!bh_particle_find(unknown[_i], &p), "%s", unknown[_i]);
    ck_assert_int_eq(p.charge, 77);
}
END_TEST

static const struct {
    const char *wrote, *meant;
} guesses[] = {
    {"e-", "electron"},
    {"e+", "positron"},
    {"p", "proton"},
    {"d", "deuteron"},
    {"t", "triton"},
    {"mu+", "muon+"},
    {"mu-", "muon-"},
    {"pi+", "pion+"},
    {"pi-", "pion-"},
    {"a", "alpha"},
    {"alpha particle", "alpha"},
    {"Alpha-particles", "alpha"},
    {"electrons", "electron"},
    {"Electron beam", "electron"},
    {"Positrons", "positron"},
    {"elecrton", "electron"},
    {"muons", "muon-"},
    {"muon +", "muon+"},
    {"antimuon", "muon+"},
    {"H1", "proton"},
    {"Pb208", "208Pb"},
    {"208-Pb", "208Pb"},
    {"C", "12C"},
    {"He", "alpha"},
    {"he3", "helion"},
    {"3-He", "helion"},
    {"helium-3", "helion"},
    {"protn", "proton"},
    {"12c", "12C"},
    {"deuterium", "deuteron"},
    {"", NULL},
    {"graviton", NULL},
    {"99C", NULL},
    {"n", NULL},
    {"x", NULL},
    {"a very long name indeed of nothing", NULL},
};

START_TEST(a_wrong_name_suggests_the_right_one)
{
    const char *meant = bh_particle_suggest(guesses[_i].wrote);
    if (!guesses[_i].meant) {
        ck_assert_msg(meant == NULL, "'%s' -> %s", guesses[_i].wrote, meant);
        return;
    }
    ck_assert_msg(meant && strcmp(meant, guesses[_i].meant) == 0, "'%s' -> %s, not %s",
                  guesses[_i].wrote, meant ? meant : "nothing", guesses[_i].meant);
    bh_particle p;
    ck_assert(bh_particle_find(meant, &p));
}
END_TEST

START_TEST(all_names_are_listed)
{
    int n = 0;
    bh_particle p;
    for (const char *name; (name = bh_particle_name(n)) != NULL; n++) {
        ck_assert(bh_particle_find(name, &p));
        ck_assert_str_eq(p.name, name);
    }
    ck_assert_int_eq(n, 11);
    ck_assert_ptr_null(bh_particle_name(-1));
}
END_TEST

START_TEST(constants_agree_with_each_other)
{
    ck_assert_double_eq_tol(BH_HBARC * BH_HBARC * 1e4 / BH_HBARC2_UB, 1.0, 1e-11);
    ck_assert_double_eq_tol(BH_ALPHA * BH_HBARC / BH_MASS_ELECTRON / BH_CLASSICAL_R, 1.0, 5e-10);
    ck_assert_double_eq_tol(BH_BOLTZMANN_R / BH_AVOGADRO, 1.380649e-23, 1e-36); /* SI 2019 */
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("particle");
    tcase_add_loop_test(tests, a_particle_is_what_it_is, 0, COUNT(rows));
    tcase_add_loop_test(tests, other_names_are_refused, 0, COUNT(unknown));
    tcase_add_loop_test(tests, a_wrong_name_suggests_the_right_one, 0, COUNT(guesses));
    tcase_add_test(tests, all_names_are_listed);
    tcase_add_test(tests, constants_agree_with_each_other);
    return run_suite("units/particle", tests);
}
