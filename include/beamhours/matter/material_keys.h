/* material_keys.h - the keys of a material file: one table for reader, messages and documentation.
 */
#ifndef BH_MATTER_MATERIAL_KEYS_H
#define BH_MATTER_MATERIAL_KEYS_H

#include "beamhours/schema/schema.h"

/* What a file may give a source for: X(key) */
#define BH_MATERIAL_SOURCED(X) \
    X(formula)                 \
    X(atoms)                   \
    X(weights)                 \
    X(density)                 \
    X(mean_excitation)         \
    X(density_effect)          \
    X(radiation_length)        \
    X(melting)                 \
    X(boiling)                 \
    X(conductivity)            \
    X(hazards)

typedef struct {
    bh_section section;
#define BH_SOURCE_MEMBER(key) bh_word key;
    BH_MATERIAL_SOURCED(BH_SOURCE_MEMBER)
#undef BH_SOURCE_MEMBER
} bh_sources_written;

typedef struct {
    bh_section section;
    bh_value density;      /* [g/cm3] */
    bh_value c, x0, x1;    /* [1] */
    bh_value a, k, delta0; /* [1] */
} bh_effect_written;

typedef struct {
    bh_section section;
    bh_value material;
    bh_word summary, state;
    bh_pairs formula, atoms, weights;
    bh_value density;               /* [g/cm3] */
    bh_value temperature, pressure; /* [K] [Pa] */
    bh_value molecule;              /* [1] */
    bh_value mean_excitation;       /* [MeV] */
    bh_effect_written density_effect;
    bh_value radiation_length; /* [g/cm2] */
    bh_value melting, boiling; /* [K] */
    bh_value conductivity;     /* [W/cm/K] */
    bh_words hazards;
    bh_sources_written sources;
} bh_material_written;

/* Reads into a bh_material_written; docs/materials.md says the same in prose. */
extern const bh_schema bh_material_schema;

/* The words of `state`, in the order of bh_state, NULL at the end. */
extern const char *const bh_material_states[];

#endif
