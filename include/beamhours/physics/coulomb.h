/* coulomb.h - the registry of Coulomb models: what the nuclear charge does to the waves. */
#ifndef BH_PHYSICS_COULOMB_H
#define BH_PHYSICS_COULOMB_H

#include <stddef.h>

#include "beamhours/physics/process.h"

/* One registry row.  Constant data. */
typedef struct {
    const char *name;    /* as in a plan: "plane-wave" */
    const char *summary; /* one line */
    const char *source;
    const char *range; /* where it holds, in words */
    /* Fills factor [1], n values, by which the plane-wave cross section of each event of
     * `encounter` is multiplied.  No allocation. */
    void (*factor)(const bh_encounter *encounter, size_t n, const bh_event *event, double *factor);
    /* A sentence when what is left out matters for `encounter`, into `out`; returns its length, 0
     * when all is well. */
    int (*caveat)(const bh_encounter *encounter, char *out, size_t size);
} bh_coulomb;

/* By name; NULL when it is not in the registry.  "default" or a NULL name: the best there is.  The
 * i-th; NULL past the end. */
const bh_coulomb *bh_coulomb_find(const char *name);
const bh_coulomb *bh_coulomb_at(int i);

#endif
