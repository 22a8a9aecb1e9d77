/* electron_loss.h - collision and radiative loss of electrons and positrons. */
#ifndef BH_MATTER_ELECTRON_LOSS_H
#define BH_MATTER_ELECTRON_LOSS_H

#include "beamhours/matter/log_spline.h"
#include "beamhours/matter/medium.h"

/* Returns [MeV cm2/g] the collision loss of electrons (charge -1) or positrons (charge 1) of
 * `kinetic` [MeV]: Berger and Seltzer, ICRU Report 37 (1984), eqs. 2.10 to 2.14. */
double bh_berger_seltzer(const bh_medium *medium, int charge, double kinetic);

/* Radiative loss times radiation length over total energy. */
typedef struct {
    bh_log_spline scaled; /* [MeV] -> [1], 0.1 MeV to 1 GeV */
    double strength;      /* [cm2/g] one over the radiation length */
    double limit;         /* [1] at complete screening, 1 + (b - 4/3) / 2 */
    double missing;       /* [1] what is missing to the limit at 1 GeV */
    double power;         /* [1] with which that falls */
} bh_electron_photons;

void bh_electron_photons_make(const bh_medium *medium, bh_electron_photons *out);

/* Returns [MeV cm2/g] the radiative loss of electrons or positrons (`charge`) of `kinetic` [MeV]
 * in the medium that `r` was made for. */
double bh_electron_photons_at(const bh_electron_photons *r, const bh_medium *medium, int charge,
                              double kinetic);

#endif
