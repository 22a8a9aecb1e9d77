/* composition.h - what is written of elements and isotopes, worked out to nuclides. */
#ifndef BH_MATTER_COMPOSITION_H
#define BH_MATTER_COMPOSITION_H

#include "beamhours/matter/material.h"
#include "beamhours/schema/schema.h"

/* How shares are written: plain numbers of atoms; shares of all atoms; shares of the weight. */
typedef enum { BH_SHARES_FORMULA, BH_SHARES_ATOMS, BH_SHARES_WEIGHTS } bh_share_kind;

typedef struct {
    const char *key; /* under which they stand, for complaints */
    bh_share_kind kind;
    const bh_pairs *pairs; /* name: "Pb" or "208Pb"; value [1] positive */
} bh_shares;

typedef struct {
    size_t count;
    bh_constituent *parts;   /* of the reading's arena; order as in bh_material */
    double mean_atomic_mass; /* [g/mol] per atom, all elements together */
} bh_composition;

/*
 * Works `shares` out: elements are written out in the isotopes that nature has of them, weights
 * divided by masses of neutral atoms, what is named twice added, and all made to add up to 1.
 * Shares in % may miss 100 % by 0.05 % for rounding.
 * Complains (in reading->diags, about shares->key of `section`) about names that are no element or
 * nuclide or not in the table, elements that nature does not have, and shares that do not add up to
 * 100 %; then, and when a value could not be read, out->count is 0.
 * Returns BH_OK also after complaints; BH_ENOMEM when there is no memory.
 */
BH_CHECKED bh_code bh_composition_read(const bh_reading *reading, const bh_section *section,
                                       const bh_shares *shares, bh_composition *out);

#endif
