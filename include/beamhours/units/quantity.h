/* quantity.h - "20.0 ± 0.2 uA": text to number, unit and uncertainty, and back. */
#ifndef BH_UNITS_QUANTITY_H
#define BH_UNITS_QUANTITY_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/error.h"

/* What a key wants.  X(id, name in messages, internal unit, two units that would do) */
#define BH_DIMENSIONS(X)                                                       \
    X(BH_DIM_ENERGY, "an energy", "MeV", "MeV or GeV")                         \
    X(BH_DIM_ENERGY_OR_PER_U, "an energy", "MeV", "MeV or MeV/u")              \
    X(BH_DIM_MOMENTUM, "a momentum", "MeV/c", "MeV/c or GeV/c")                \
    X(BH_DIM_Q2, "a momentum transfer squared", "MeV2", "GeV2 or fm-2")        \
    X(BH_DIM_CURRENT, "a current", "A", "uA or nA")                            \
    X(BH_DIM_RATE, "a rate", "/s", "/s or kHz")                                \
    X(BH_DIM_CHARGE, "a charge", "C", "C or mC")                               \
    X(BH_DIM_TIME, "a time", "s", "h or d")                                    \
    X(BH_DIM_ANGLE, "an angle", "rad", "deg or mrad")                          \
    X(BH_DIM_SOLID_ANGLE, "a solid angle", "sr", "msr or sr")                  \
    X(BH_DIM_LENGTH, "a length", "cm", "mm or cm")                             \
    X(BH_DIM_AREAL_DENSITY, "a mass per area", "g/cm2", "mg/cm2 or g/cm2")     \
    X(BH_DIM_AREAL_NUMBER, "a number per area", "/cm2", "/cm2 or /m2")         \
    X(BH_DIM_DENSITY, "a density", "g/cm3", "g/cm3 or kg/m3")                  \
    X(BH_DIM_SHARE, "a share", "1", "% or ppm")                                \
    X(BH_DIM_SHARE_PER_CURRENT, "a share per current", "/A", "%/uA or ppm/nA") \
    X(BH_DIM_TEMPERATURE, "a temperature", "K", "K or degC")                   \
    X(BH_DIM_PRESSURE, "a pressure", "Pa", "bar or mbar")                      \
    X(BH_DIM_POWER, "a power", "W", "kW or W")                                 \
    X(BH_DIM_CROSS_SECTION, "a cross section", "ub", "ub or nb")               \
    X(BH_DIM_FIELD, "a magnetic field", "T", "T")                              \
    X(BH_DIM_CONDUCTIVITY, "a thermal conductivity", "W/cm/K", "W/m/K or W/cm/K")

typedef enum {
#define BH_DIM_ID(id, name, unit, examples) id,
    BH_DIMENSIONS(BH_DIM_ID)
#undef BH_DIM_ID
        BH_DIM_COUNT
} bh_dimension;

/* A measured value in the internal unit of its dimension (the table above). */
typedef struct {
    double value;       /* [1] in the dimension's internal unit, named in the table above */
    double uncertainty; /* [1] standard uncertainty, same unit; 0 where none was given */
    bool uncertain;     /* a ± was written */
    bool per_u;         /* BH_DIM_ENERGY_OR_PER_U only: value is MeV per mass number */
} bh_quantity;

/*
 * Reads `text` as a quantity of `dimension`.  The error says what was read, what is needed and two
 * units that would do; slips get messages of their own (decimal comma, thousands mark, bare
 * fraction for a share, "20 C" for a temperature, 7·10^13).  Independent of the locale.
 * Returns BH_OK or BH_EPLAN with the sentence in err->text; `out` untouched on failure.
 */
BH_CHECKED bh_code bh_quantity_parse(const char *text, bh_dimension dimension, bh_quantity *out,
                                     bh_error *err);

/*
 * Writes the shortest text that reads back to the same quantity, with the prefix that reads best
 * ("20.0 ± 0.2 uA" -> "20 ± 0.2 uA"), into `out` of `size` bytes.  Returns what snprintf would.
 */
int bh_quantity_print(const bh_quantity *quantity, bh_dimension dimension, char *out, size_t size);

/* Returns [1] the size of `unit` ("mg/cm2") in the internal unit of `dimension`, or 0 when it is
 * no unit of that dimension (degC, which has an offset, also gives 0). */
double bh_unit_size(const char *unit, bh_dimension dimension);

#endif
