/* momentum_range.h - integrals of an inclusive spectrum over the momenta that an arm accepts. */
#ifndef BH_PHYSICS_MOMENTUM_RANGE_H
#define BH_PHYSICS_MOMENTUM_RANGE_H

#include <stddef.h>

#include "beamhours/physics/background.h"
#include "beamhours/physics/inclusive.h"

enum { BH_SPECTRUM_EDGES = 24 };

/* A spectrum; smooth between its edges, and there either computed or not. */
typedef struct {
    const bh_inclusive *in;
    const void *context;
    /* Fills value [ub/sr/MeV] d2sigma / dOmega dE' and doubt [1], its relative uncertainty. */
    void (*spectrum)(const void *context, const bh_inclusive *in, const bh_transfer *at,
                     double *value, double *doubt);
    /* NULL where it is computed, else what is not. */
    const char *(*outside)(const void *context, const bh_transfer *at);
    size_t count;
    double fastest;                 /* [MeV/c] beyond it the spectrum is 0; 0: it is nowhere so */
    double edge[BH_SPECTRUM_EDGES]; /* [MeV/c] in any order, also outside the range */
} bh_spectrum;

/*
 * Fills value [ub/sr] and validity as bh_background.momentum_integral does.  Kronrod's 15 points on
 * each piece between edges, halved until Gauss's 7 agree within 3e-5 of the whole: 2e-5 held.
 */
void bh_momentum_range_integral(const bh_spectrum *spectrum, const bh_momentum_range *range,
                                double *value, bh_background_validity *validity);

/* Whether range and encounter are numbers within their bounds; else fills value [ub/sr] and
 * validity with the refusal. */
bool bh_momentum_range_good(const bh_encounter *encounter, const bh_momentum_range *range,
                            double *value, bh_background_validity *validity);

#endif
