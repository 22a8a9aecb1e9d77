/* struck.h - the nuclei of a target: which nuclides, in which layers, signal or background. */
#ifndef BH_RUN_STRUCK_H
#define BH_RUN_STRUCK_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/arena.h"
#include "beamhours/physics/structure.h"
#include "beamhours/plan/plan.h"

typedef enum {
    BH_ORIGIN_SIGNAL, /* the scatterer in a sample layer */
    BH_ORIGIN_OTHER,  /* another nuclide of a sample, or any of a backing: gone with the sample */
    BH_ORIGIN_WINDOW  /* stays when the sample is out */
} bh_origin;

/* A nuclide that the beam can strike. */
typedef struct {
    int z, a;
    double mass; /* [MeV] bare nucleus */
} bh_struck;

/* A nuclide in one layer. */
typedef struct {
    size_t layer, nuclide; /* numbers in the target and in the list */
    bh_origin origin;
    double number; /* [1/cm2] nuclei along the normal of the layer */
} bh_presence;

typedef struct {
    const bh_target *target;
    size_t count; /* distinct nuclides */
    const bh_struck *nuclides;
    size_t presence_count;
    const bh_presence *presences;
    size_t main; /* of the nuclides, the most abundant isotope of the scatterer */
} bh_struck_list;

/* Lists the nuclei of `target`, in `arena`.  False when there is no memory. */
bool bh_struck_from_target(const bh_target *target, bh_arena *arena, bh_struck_list *list);

#endif
