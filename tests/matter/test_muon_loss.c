/* test_muon_loss.c - radiation of muons. */
#include "passing.h"

#include "beamhours/matter/muon_loss.h"
#include "beamhours/matter/radiation_length.h"
#include "beamhours/units/constants.h"

/* Where radiation and ionisation take alike: Groom, Mokhov and Striganov, At. Data Nucl. Data
 * Tables 78 (2001) 183, for negative muons; from memory. */
START_TEST(critical_energies)
{
    const struct {
        const char *material;
        double energy; /* MeV */
        double tolerance;
    } rows[] = {{"graphite", 1065e3, 0.02}, {"iron", 347e3, 0.025},
                {"copper", 317e3, 0.025},   {"lead", 141e3, 0.09},
                {"uranium", 128e3, 0.10},   {"liquid-hydrogen", 3611e3, 0.13}};
    for (int i = 0; i < COUNT(rows); i++) {
        bh_stopping *s = stopping_of("muon-", rows[i].material);
        const bh_loss loss = bh_stopping_at(s, rows[i].energy);
        NEAR(loss.radiative, loss.collision, rows[i].tolerance, "%s; Groom et al. 2001",
             rows[i].material);
        bh_stopping_free(s);
    }
}
END_TEST

/* Complete screening: (m / M)^2 of what electrons of equal speed radiate, with a shorter logarithm;
 * pairs somewhat more than photons (Groom et al. 2001, sect. 4). */
START_TEST(sizes)
{
    const int elements[] = {1, 6, 13, 26, 29, 50, 82};
    const double ratio = pow(BH_MASS_ELECTRON / BH_MASS_MUON, 2);
    for (int i = 0; i < COUNT(elements); i++) {
        const double energy = 1e6;
        const double photons = bh_muon_photons(elements[i], energy) / energy;
        const double pairs = bh_muon_pairs(elements[i], energy) / energy;
        const double electron = bh_radiation_strength(elements[i]) * ratio;
        ck_assert_msg(photons > electron && photons < 3.0 * electron,
                      "Z = %d: %g of the electron's", elements[i], photons / electron);
        ck_assert_msg(pairs > 1.0 * photons && pairs < 1.8 * photons, "Z = %d: pairs %g photons",
                      elements[i], pairs / photons);
    }
}
END_TEST

START_TEST(rises_with_energy)
{
    double photons = 0.0;
    double pairs = 0.0;
    for (double energy = 110.0; energy < 1e7; energy *= 1.5) {
        const double more = bh_muon_photons(26, energy) / energy;
        const double more_pairs = bh_muon_pairs(26, energy) / energy;
        ck_assert_msg(more > photons, "photons at %g", energy);
        ck_assert_msg(more_pairs >= pairs, "pairs at %g", energy);
        photons = more;
        pairs = more_pairs;
    }
    ck_assert_double_eq(bh_muon_photons(26, 100.0), 0.0);
    ck_assert_double_eq(bh_muon_pairs(26, 100.0), 0.0);
}
END_TEST

/* What is left out where it does not matter: below 1 GeV radiation is 0.2 % of the loss. */
START_TEST(small_at_low_energy)
{
    bh_stopping *s = stopping_of("muon+", "iron");
    for (double t = 1.0; t < 1000.0; t *= 2.0) {
        const bh_loss loss = bh_stopping_at(s, t);
        ck_assert_double_lt(loss.radiative, 2e-3 * loss.collision);
        ck_assert_double_ge(loss.radiative, 0.0);
    }
    bh_stopping_free(s);
}
END_TEST

START_TEST(spline_follows)
{
    const bh_medium m = medium_of("copper");
    bh_log_spline s;
    bh_muon_radiation_make(&m, &s);
    for (double t = 1e3; t < 5e6; t *= 1.37) {
        const double energy = t + BH_MASS_MUON;
        const double want =
            (bh_muon_photons(29, energy) + bh_muon_pairs(29, energy)) / m.mean_atomic_mass +
            0.4e-6 * (energy - 300.0);
        NEAR(bh_log_spline_at(&s, t), want, 0.02, "at %g MeV", t);
    }
}
END_TEST

int main(void)
{
    TCase *t = tcase_create("muon loss");
    tcase_add_checked_fixture(t, open_library, close_library);
    tcase_add_test(t, critical_energies);
    tcase_add_test(t, sizes);
    tcase_add_test(t, rises_with_energy);
    tcase_add_test(t, small_at_low_energy);
    tcase_add_test(t, spline_follows);
    return run_suite("muon loss", t);
}
