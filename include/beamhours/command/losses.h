/* losses.h - what a particle of one energy meets with in a material. */
#ifndef BH_COMMAND_LOSSES_H
#define BH_COMMAND_LOSSES_H

#include "beamhours/base/error.h"
#include "beamhours/matter/material.h"
#include "beamhours/units/particle.h"

enum { BH_PASSAGE_FACTS = 8 };

typedef struct {
    const char *key, *unit;
    double value; /* [1] in `unit` */
} bh_passage_fact;

typedef struct {
    size_t count;
    bh_passage_fact facts[BH_PASSAGE_FACTS];
} bh_passage_facts;

/* Fills `out` for `particle` of `kinetic` [MeV] in `material` at its nominal density.  The range of
 * electrons and muons is that with radiation.  BH_EDOMAIN as stopping.h and range.h say; BH_ENOMEM.
 */
BH_CHECKED bh_code bh_passage_of(const bh_particle *particle, const bh_material *material,
                                 double kinetic, bh_passage_facts *out, bh_error *err);

#endif
