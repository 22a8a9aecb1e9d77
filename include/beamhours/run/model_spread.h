/* model_spread.h - how well a cross section is known: other descriptions of the nucleus, the field
 * that bends the waves, the electrons around it. */
#ifndef BH_RUN_MODEL_SPREAD_H
#define BH_RUN_MODEL_SPREAD_H

#include "beamhours/rates/acceptance.h"
#include "beamhours/run/channel.h"
#include "beamhours/run/workspace.h"

enum { BH_MOST_OTHERS = 24 };

/* Over the polar angles of one row, weighted with the rate. */
typedef struct {
    double fit; /* [1] relative standard uncertainty that the publication of the model in use
                   gives at the middle; below 0: none */
    int count;  /* other published descriptions of the nuclide; 0 where `fit` is given */
    const char *const *name;    /* of each; valid until bh_workspace_trim */
    double off[BH_MOST_OTHERS]; /* [1] relative change of the cross section with each; NAN where the
                                   middle lies outside its data while others have some there */
    double data;                /* [1] relative standard uncertainty by the measurements behind the
                                   model in use, in quadrature; 0 where `fit` is given */
    double coulomb;             /* [1] relative size of what plane waves leave out */
    double screening;           /* [1] relative size of what atomic electrons would change */
} bh_model_spread;

/*
 * Fills `out` for `channel` between the polar angles of `where` [rad].
 *
 * Other descriptions are all the registry has for the nuclide but definitions (point, dipole)
 * and, up to four nucleons, shapes of heavier nuclei made to fit a radius;
 * those with data at this momentum transfer, or all where none has.  Their form factors are kept on
 * a grid of momentum transfers, 0.01/fm apart, linear between: good to 1e-3 of the spread away from
 * diffraction minima.
 *
 * coulomb, leptons on Z >= 2: the second Born term of a point charge, pi Z alpha beta s (1 - s) /
 * (1 - beta^2 s^2) with s = sin(angle/2) (McKinley & Feshbach, Phys. Rev. 74 (1948) 1759), and the
 * form factor at the momentum transfer inside the nucleus, q (1 + V/E) with V = 4/5 of the
 * potential at the centre of a uniform sphere (Aste, von Arx & Trautmann, Eur. Phys. J. A 26 (2005)
 * 167, from memory).  An estimate of its size; sign included.
 *
 * screening: slow heavy charges Andersen et al., Phys. Rev. A 21 (1980) 1891; else a Thomas-Fermi
 * form factor 1 / (1 + q^2 a^2), a = 0.885 a_Bohr Z^(-1/3).
 *
 * BH_ENOMEM.
 */
BH_CHECKED bh_code bh_model_spread_make(bh_workspace *workspace, const bh_channel *channel,
                                        bh_interval where, bh_model_spread *out, bh_error *err);

/* Returns [1] one number for it: the fit's uncertainty, or half the range of `off` with 0 among
 * them, in quadrature with the data. */
double bh_model_spread_size(const bh_model_spread *spread);

#endif
