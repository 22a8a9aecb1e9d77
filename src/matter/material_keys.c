/* material_keys.c - the keys of a material file. */
#include "beamhours/matter/material_keys.h"

#include "beamhours/matter/hazard.h"

#define SOURCE_KEY(key)                                    \
    {.name = #key,                                         \
     .kind = BH_KEY_TEXT,                                  \
     .offset = offsetof(bh_sources_written, key),          \
     .meaning = "where this comes from, or `from memory`", \
     .example = "\"from memory\""},
static const bh_key source_keys[] = {BH_MATERIAL_SOURCED(SOURCE_KEY)};

static const bh_schema source_schema = {.name = "the sources of a material",
                                        .size = sizeof(bh_sources_written),
                                        .keys = source_keys,
                                        .count = sizeof source_keys / sizeof source_keys[0]};

#define EFFECT_NUMBER(key, text, sample)                                                   \
    {                                                                                      \
        .name = #key, .kind = BH_KEY_NUMBER, .flags = BH_KEY_REQUIRED,                     \
        .offset = offsetof(bh_effect_written, key), .meaning = (text), .example = (sample) \
    }
static const bh_key effect_keys[] = {
    {.name = "density",
     .kind = BH_KEY_QUANTITY,
     .dimension = BH_DIM_DENSITY,
     .flags = BH_KEY_REQUIRED,
     .above = "0 g/cm3",
     .offset = offsetof(bh_effect_written, density),
     .meaning = "the density that the set belongs to",
     .example = "2.6989 g/cm3"},
    EFFECT_NUMBER(c, "C", "4.2395"),
    EFFECT_NUMBER(x0, "x0", "0.1708"),
    EFFECT_NUMBER(x1, "x1", "3.0127"),
    EFFECT_NUMBER(a, "a", "0.08024"),
    EFFECT_NUMBER(k, "the exponent, k or m in tables", "3.6345"),
    EFFECT_NUMBER(delta0, "delta0 of a conductor", "0.12"),
};

static const bh_schema effect_schema = {.name = "a density effect",
                                        .size = sizeof(bh_effect_written),
                                        .keys = effect_keys,
                                        .count = sizeof effect_keys / sizeof effect_keys[0]};

const char *const bh_material_states[] = {"solid", "liquid", "gas", "vacuum", NULL};

enum { COMPOSITION = 1 }; /* the group of keys that exclude each other */

#define QUANTITY(key, what, low, text, sample)                                               \
    {                                                                                        \
        .name = #key, .kind = BH_KEY_QUANTITY, .dimension = (what), .above = (low),          \
        .offset = offsetof(bh_material_written, key), .meaning = (text), .example = (sample) \
    }
#define SHARES(key, of, low, text, sample)                                                   \
    {                                                                                        \
        .name = #key, .kind = BH_KEY_TABLE, .item = (of), .dimension = BH_DIM_SHARE,         \
        .flags = BH_KEY_NOT_EMPTY, .group = COMPOSITION, .above = (low),                     \
        .offset = offsetof(bh_material_written, key), .meaning = (text), .example = (sample) \
    }

static const bh_key material_keys[] = {
    {.name = "material",
     .kind = BH_KEY_COUNT,
     .flags = BH_KEY_REQUIRED,
     .least = "1",
     .most = "1",
     .offset = offsetof(bh_material_written, material),
     .meaning = "version of the format",
     .example = "1"},
    {.name = "summary",
     .kind = BH_KEY_TEXT,
     .flags = BH_KEY_REQUIRED,
     .offset = offsetof(bh_material_written, summary),
     .meaning = "one line",
     .example = "\"Aluminium\""},
    {.name = "state",
     .kind = BH_KEY_WORD,
     .flags = BH_KEY_REQUIRED,
     .words = bh_material_states,
     .offset = offsetof(bh_material_written, state),
     .meaning = "solid, liquid, gas or vacuum",
     .example = "solid"},
    SHARES(formula, BH_KEY_NUMBER, "0", "atoms of a formula", "{H: 2, O: 1}"),
    SHARES(atoms, BH_KEY_QUANTITY, "0 %", "shares of all atoms", "{6Li: 95 %, 7Li: 5 %}"),
    SHARES(weights, BH_KEY_QUANTITY, "0 %", "shares of the weight", "{Cu: 63 %, Zn: 37 %}"),
    QUANTITY(density, BH_DIM_DENSITY, "0 g/cm3", "density", "2.699 g/cm3"),
    QUANTITY(temperature, BH_DIM_TEMPERATURE, "0 K", "of a gas: its density belongs to it",
             "293.15 K"),
    QUANTITY(pressure, BH_DIM_PRESSURE, "0 Pa", "of a gas: its density belongs to it",
             "101.325 kPa"),
    {.name = "molecule",
     .kind = BH_KEY_NUMBER,
     .least = "1",
     .offset = offsetof(bh_material_written, molecule),
     .meaning = "of a gas: atoms in a molecule, mean of a mixture",
     .example = "2"},
    QUANTITY(mean_excitation, BH_DIM_ENERGY, "0 eV", "mean excitation energy I", "166 eV"),
    {.name = "density_effect",
     .kind = BH_KEY_MAPPING,
     .children = &effect_schema,
     .offset = offsetof(bh_material_written, density_effect),
     .meaning = "parameters of Sternheimer, Berger and Seltzer",
     .example = "{density: 2.6989 g/cm3, c: 4.2395, x0: 0.1708, x1: 3.0127, a: 0.08024, "
                "k: 3.6345, delta0: 0.12}"},
    QUANTITY(radiation_length, BH_DIM_AREAL_DENSITY, "0 g/cm2", "as published", "24.01 g/cm2"),
    QUANTITY(melting, BH_DIM_TEMPERATURE, "0 K", "melting point", "933.47 K"),
    QUANTITY(boiling, BH_DIM_TEMPERATURE, "0 K", "boiling point", "2792 K"),
    QUANTITY(conductivity, BH_DIM_CONDUCTIVITY, "0 W/m/K", "thermal conductivity", "237 W/m/K"),
    {.name = "hazards",
     .kind = BH_KEY_WORDS,
     .words = bh_hazard_words,
     .offset = offsetof(bh_material_written, hazards),
     .meaning = "words that lead to cautions",
     .example = "[lead, toxic]"},
    {.name = "sources",
     .kind = BH_KEY_MAPPING,
     .children = &source_schema,
     .offset = offsetof(bh_material_written, sources),
     .meaning = "where each value comes from",
     .example = "{density: \"from memory\"}"},
};

const bh_schema bh_material_schema = {.name = "a material",
                                      .size = sizeof(bh_material_written),
                                      .keys = material_keys,
                                      .count = sizeof material_keys / sizeof material_keys[0]};
