/* radiative.h - the registry of internal radiative corrections. */
#ifndef BH_PHYSICS_RADIATIVE_H
#define BH_PHYSICS_RADIATIVE_H

#include <stddef.h>

#include "beamhours/physics/process.h"

/* One registry row.  Constant data. */
typedef struct {
    const char *name;    /* as in a plan: "none" */
    const char *summary; /* one line */
    const char *source;
    const char *range; /* where it holds, in words */
    /* Fills factor [1], n values, kept of each event of `encounter` by a cut `cut` [MeV] below the
     * elastic line.  No allocation. */
    void (*factor)(const bh_encounter *encounter, double cut, size_t n, const bh_event *event,
                   double *factor);
} bh_radiative;

/* By name; NULL when it is not in the registry.  "default" or a NULL name: the best there is.  The
 * i-th; NULL past the end. */
const bh_radiative *bh_radiative_find(const char *name);
const bh_radiative *bh_radiative_at(int i);

#endif
