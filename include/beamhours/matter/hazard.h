/* hazard.h - what is dangerous in a material: the words of its file, and what it is made of. */
#ifndef BH_MATTER_HAZARD_H
#define BH_MATTER_HAZARD_H

#include "beamhours/matter/material.h"

/* X(id, word in a material file) */
#define BH_HAZARDS(X)                           \
    X(BH_HAZARD_FLAMMABLE_GAS, "flammable-gas") \
    X(BH_HAZARD_FLAMMABLE, "flammable")         \
    X(BH_HAZARD_CRYOGEN, "cryogen")             \
    X(BH_HAZARD_OXYGEN, "oxygen-displacing")    \
    X(BH_HAZARD_OXIDISING, "oxidising")         \
    X(BH_HAZARD_REACTIVE, "water-reactive")     \
    X(BH_HAZARD_BERYLLIUM, "beryllium")         \
    X(BH_HAZARD_LEAD, "lead")                   \
    X(BH_HAZARD_URANIUM, "uranium")             \
    X(BH_HAZARD_TOXIC, "toxic")                 \
    X(BH_HAZARD_RADIOACTIVE, "radioactive")

typedef enum {
#define BH_HAZARD_ID(id, word) id,
    BH_HAZARDS(BH_HAZARD_ID)
#undef BH_HAZARD_ID
        BH_HAZARD_COUNT
} bh_hazard;

/* The words in the order of bh_hazard, NULL at the end. */
extern const char *const bh_hazard_words[BH_HAZARD_COUNT + 1];

/* What a hazard means, to be put behind the name of a material: "toxic when breathed in or
 * swallowed".  Never NULL. */
const char *bh_hazard_meaning(bh_hazard hazard);

/*
 * The hazards of `material` as bits 1u << bh_hazard: those its file names, and those that follow
 * from state and composition whatever the file says (hydrogen that is not solid, gases other than
 * those with oxygen, liquids that boil below 200 K; beryllium, lead, uranium and elements without
 * stable isotopes from 1 % of the atoms; alkali metals).  `toxic` gives way to beryllium, lead and
 * uranium, `radioactive` to uranium, which say more.  The list warns; it is never complete.
 */
unsigned bh_material_hazards(const bh_material *material);

#endif
