/* structure.h - the registry of form factors: what a struck nucleus or nucleon looks like inside.
 */
#ifndef BH_PHYSICS_STRUCTURE_H
#define BH_PHYSICS_STRUCTURE_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

/*
 * Any target, unpolarised, enters a one-photon cross section through two numbers, `ge2` and `gm2`,
 * in the place of GE^2 and GM^2 of a spin-1/2 particle, tau = q2 / 4 M^2, charge Z included:
 *   nucleon, 3He, 3H   GE^2, GM^2            (GE(0) = Z, GM(0) = moment in e hbar / 2 M of itself)
 *   spin 0             (1 + tau) Z^2 F^2, 0
 *   deuteron           (1 + tau)(GC^2 + 8/9 tau^2 GQ^2), 2/3 (1 + tau) GM^2
 */

/* What the numbers are good for. */
typedef enum {
    BH_FIT_CROSS_SECTION, /* describes published cross sections (two-photon exchange left inside) */
    BH_FIT_CORRECTED,     /* corrected for two-photon exchange: for polarisation observables */
    BH_FIT_NEUTRAL        /* the question does not arise, or was not asked */
} bh_fit_use;

/* One registry row: a named model.  Constant data. */
typedef struct bh_structure_model {
    const char *name;    /* as in a plan: "kelly-2004", "fourier-bessel" */
    const char *summary; /* one line for choosers */
    const char *source;  /* author, journal, year */
    bh_fit_use use;
    double q2_min,
        q2_max; /* [GeV2] range of the data it was fitted to; per-nuclide sets narrow it */
} bh_structure_model;

/* A model made ready for one target: everything precomputed, read-only afterwards, thread safe. */
typedef struct bh_structure bh_structure;

/*
 * Charge densities include the finite size of the nucleons and are renormalised to Z; their form
 * factor is taken at q = sqrt(q2).  A published set that misses the radius of Angeli & Marinova
 * 2013 by more than 1 % and twice its uncertainty is no default.
 *
 * Prepares `name` for nucleus z, a (0, 1 = neutron).  name NULL or "default": the best founded for
 * counting rates; "point": no structure; "fourier-bessel/2": the second published set.  A nucleus
 * without a published density gets a two-parameter Fermi shape with its radius from Angeli &
 * Marinova 2013 (else 1.2 A^(1/3) fm), flagged in bh_structure_note.
 * Returns NULL with the reason (and which models would do) in err.  Free with bh_structure_free.
 */
bh_structure *bh_structure_new(const char *name, int z, int a, bh_error *err);
void bh_structure_free(bh_structure *structure);

/* Fills ge2 [1], gm2 [1] for n values of q2 [MeV^2], each 0 <= q2.  No allocation. */
void bh_structure_eval(const bh_structure *structure, size_t n, const double *q2, double *ge2,
                       double *gm2);

/* The relative standard uncertainty of a cross section that comes from the fit at q2 [MeV^2], where
 * the publication gives one: the larger of those at epsilon 0 and 1.  Returns [1], -1 not known. */
double bh_structure_uncertainty(const bh_structure *structure, double q2);

/* Of the measurements that a description rests on. */
typedef struct {
    double uncertainty; /* [1] relative standard uncertainty of their cross sections as their
                           authors quote it: normalisations and fits to them; 0 not known */
    const char *source; /* who says so, and from where it is known; "" */
} bh_structure_data;

bh_structure_data bh_structure_measured(const bh_structure *structure);

/* Returns [1] what that makes of a cross section at q2 [MeV^2]: all of it where the form factor has
 * fallen, nothing at q2 = 0, where every description has the charge: uncertainty times
 * 1 - GE^2 / Z^2. */
double bh_structure_data_uncertainty(const bh_structure *structure, double q2);

/* Whether set number `set` of a model describes z, a well enough to doubt another by: a fit, not a
 * definition (point, dipole), and up to four nucleons no shape of heavier nuclei that is made to
 * fit a radius (uniform, helm, the last set of fermi-2p). */
bool bh_structure_compares(const bh_structure_model *model, int set, int z, int a);

/* The model behind it; the full name used ("fourier-bessel/2"); what was assumed ("radius from
 * Angeli & Marinova 2013: no published density", "charge alone: no magnetic form factor"), or "".
 */
const bh_structure_model *bh_structure_row(const bh_structure *structure);
const char *bh_structure_name(const bh_structure *structure);
const char *bh_structure_source(const bh_structure *structure);
const char *bh_structure_note(const bh_structure *structure);

/* Whether a note is worth a warning (spin without magnetic form factor, no published density). */
bool bh_structure_flagged(const bh_structure *structure);

/* The range of the data, of this nuclide's set where known: fills lo, hi [GeV2]. */
void bh_structure_range(const bh_structure *structure, double *lo, double *hi);

/* Returns [fm] rms charge radius implied by the model (0 for point). */
double bh_structure_radius(const bh_structure *structure);

/* Form factors by name at q2 [MeV^2], for explain: fills up to `room` names and values [1]
 * ("GE", "GM"; "F"; "GC", "GM", "GQ"; "F_ch", "F_m"); returns how many. */
int bh_structure_factors(const bh_structure *structure, double q2, int room, const char **names,
                         double *values);

/* The i-th model of the registry, NULL past the end; whether it can describe z, a; how many
 * sets it has there ("fourier-bessel" of 12C: 2; "fermi-2p" has one more than are published:
 * the last is fitted to the radius). */
const bh_structure_model *bh_structure_model_at(int i);
int bh_structure_sets(const bh_structure_model *model, int z, int a);

/* The registry name nearest to a misspelt one, or NULL. */
const char *bh_structure_suggest(const char *name);

#endif
