/* quasi_elastic.h - a lepton knocks one nucleon out of a nucleus heavier than the deuteron. */
#ifndef BH_PHYSICS_QUASI_ELASTIC_H
#define BH_PHYSICS_QUASI_ELASTIC_H

#include <stdbool.h>

#include "beamhours/base/error.h"
#include "beamhours/physics/inclusive.h"

/*
 * Both models share the nucleons' form factors of Kelly, Phys. Rev. C 70 (2004) 068202, and the
 * scaling variable psi' of Donnelly & Sick, Phys. Rev. C 60 (1999) 065502, whose energy loss is
 * shifted by what separates a nucleon.
 *
 * BH_QUASI_FERMI_GAS: the relativistic Fermi gas in closed form (Alberico et al., Phys. Rev. C 38
 * (1988) 1801), the energy loss shifted throughout; Fermi momenta of Moniz et al., Phys. Rev. Lett.
 * 26 (1971) 445, from memory.  At the peak of 12C 0.93 to 0.98 of published spectra for q of 400 to
 * 1000 MeV/c, 16 to 28 % high below.
 *
 * BH_QUASI_SCALING, what the background is counted with: scaling function of Maieron et al., Phys.
 * Rev. C 80 (2009) 035504, Fermi momenta of Maieron, Donnelly & Sick, Phys. Rev. C 65 (2002)
 * 025502 (both from memory), the suppression below twice the Fermi momentum of Tsai, Rev. Mod.
 * Phys. 46 (1974) 815, and R_T raised by 1.65: our own calibration on published spectra of 12C,
 * without which the model is 16 to 35 % low above q = 300 MeV/c.  Over 30 of those spectra with q
 * of 200 to 1400 MeV/c it gives 0.98 of the data at the peak, 4 % rms, the worst 10 % off.
 */
typedef enum { BH_QUASI_SCALING, BH_QUASI_FERMI_GAS } bh_quasi_model;

typedef struct {
    int z, n; /* protons and neutrons */
    bh_quasi_model model;
    double fermi;      /* [MeV/c] Fermi momentum, 100 .. 300 */
    double shift;      /* [MeV] of the energy loss, 0 .. 100 */
    bool interpolated; /* between published nuclei; above 208Pb the value of lead */
} bh_quasi_nucleus;

/* The nucleus z, a with published Fermi momentum and shift, in between linear in a.  BH_EDOMAIN
 * below 6Li, where none is published. */
BH_CHECKED bh_code bh_quasi_find(int z, int a, bh_quasi_model model, bh_quasi_nucleus *out,
                                 bh_error *err);

/* Returns [1] the scaling variable psi': 0 at the peak, -1 and 1 the edges of a Fermi gas.  The
 * energy loss must exceed the shift (here and below; else 0 comes out of the cross section). */
double bh_quasi_psi(const bh_quasi_nucleus *nucleus, const bh_transfer *at);

/* Fill longitudinal [1/MeV] and transverse [1/MeV], the responses of the whole nucleus. */
void bh_quasi_responses(const bh_quasi_nucleus *nucleus, const bh_transfer *at,
                        double *longitudinal, double *transverse);

/* Returns [ub/sr/MeV] d2sigma / dOmega dE' per nucleus. */
double bh_quasi_cross_section(const bh_quasi_nucleus *nucleus, const bh_inclusive *in,
                              const bh_transfer *at);

/* Returns [1] the relative standard uncertainty of BH_QUASI_SCALING at `psi` [1] psi': 12C 5 % for
 * |psi'| < 0.4, 15 % to -1 and 0.8, 50 % below -1 (as published spectra scatter about it); other
 * nuclei, untested, 20 % at least. */
double bh_quasi_uncertainty(const bh_quasi_nucleus *nucleus, double psi);

/* What BH_QUASI_SCALING was tested for. */
#define BH_QUASI_Q_LEAST  200.0  /* [MeV/c] exact; a choice */
#define BH_QUASI_Q_MOST   1400.0 /* [MeV/c] exact; a choice */
#define BH_QUASI_PSI_MOST 0.8    /* [1] exact; a choice */

/* NULL inside; else why BH_QUASI_SCALING is not to be used at that transfer. */
const char *bh_quasi_outside(const bh_quasi_nucleus *nucleus, const bh_transfer *at);

#endif
