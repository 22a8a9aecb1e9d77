/* unit.h - unit expressions such as "mg/cm2", "(GeV/c)2", "W/m/K": what they measure, how large. */
#ifndef BH_UNITS_UNIT_H
#define BH_UNITS_UNIT_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/units/quantity.h"

/* Room for a quantity or a unit in plain form [bytes], the closing NUL included. */
enum { BH_PLAIN_SIZE = 256 };

/* Stands for a plus-minus sign in a plain text. */
#define BH_PLUS_MINUS '\001'

/*
 * Writes `text` in plain form: every kind of blank is ' ', every minus '-', every micro 'u',
 * superscripts are ^digits, the degree sign is "deg", signs of multiplication are '*', "±", "+-"
 * and
 * "+/-" are BH_PLUS_MINUS; no blanks at the ends.  False when it does not fit or is not UTF-8;
 * `out` is then empty.
 */
bool bh_plain_text(const char *text, char out[BH_PLAIN_SIZE]);

/* The axes along which units differ.  Angles, shares, c and "per u" count, so that they must be
 * written. */
typedef enum {
    BH_AXIS_ENERGY,
    BH_AXIS_C,
    BH_AXIS_NUCLEON,
    BH_AXIS_LENGTH,
    BH_AXIS_TIME,
    BH_AXIS_MASS,
    BH_AXIS_ANGLE,
    BH_AXIS_SOLID_ANGLE,
    BH_AXIS_CHARGE,
    BH_AXIS_TEMPERATURE,
    BH_AXIS_POWER,
    BH_AXIS_PRESSURE,
    BH_AXIS_FIELD,
    BH_AXIS_SHARE,
    BH_AXES
} bh_axis;

/* The unit is factor * 10^decade of MeV, cm, s, g, rad, sr, C, K, W, Pa, T to these powers. */
typedef struct {
    int power[BH_AXES];
    int decade;
    double factor; /* [1] 1 unless minutes, degrees, atmospheres and their like take part */
    bool celsius;  /* degC alone: 0 degC is 273.15 K */
    bool femto;    /* all lengths in fm: an inverse length may be a momentum */
} bh_unit;

/*
 * Reads a unit in plain form, `from` up to `to`.  False when it is none; `odd` then holds the
 * symbol that is not known, or the whole when symbols are known and their arrangement is not.
 */
bool bh_unit_parse(const char *from, const char *to, bh_unit *out, char odd[BH_PLAIN_SIZE]);

/* The i-th symbol, or NULL past the end. */
const char *bh_unit_symbol(int i);

/* Turns `unit` into the internal unit of `dimension` (decade and factor change).  False when it
 * measures something else. */
bool bh_unit_convert(bh_unit *unit, bh_dimension dimension);

/* What `unit` measures ("a length", "an energy per mass number"), or NULL. */
const char *bh_unit_measures(const bh_unit *unit);

/* The known symbol that `odd` probably means where `dimension` is wanted, or NULL. */
const char *bh_unit_suggest(const char *odd, bh_dimension dimension);

/*
 * Reads the number `from` up to `to` as so many of a converted unit.  Its power of ten is moved in
 * the text, so that 1.27 mm and 0.127 cm are the same double `out` [1].  The offset of degC is not
 * added. Returns BH_EDOMAIN when the result is too large or too small for a double, BH_EPLAN when
 * there is no number.
 */
BH_CHECKED bh_code bh_number_in(const char *from, const char *to, const bh_unit *unit, double *out);

/* A number as its digits, d.ddd times 10^power. */
typedef struct {
    char digits[20];
    int count, power;
    bool negative;
} bh_decimal;

/* The shortest number of converted `unit`s that bh_number_in reads as `value` [1] to the last bit.
 * False when there is none of 17 digits (a unit with a factor may skip a double). */
bool bh_decimal_in(double value, const bh_unit *unit, bh_decimal *out);

/* Writes it times 10^-shift, with an exponent where that is shorter; returns its length. */
int bh_decimal_print(const bh_decimal *number, int shift, char out[64]);

/* Slips of the pen in numbers that have a sentence of their own. */
typedef enum {
    BH_SLIP_NONE,
    BH_SLIP_DECIMAL_COMMA, /* 0,5 */
    BH_SLIP_COMMA,         /* 12,345: decimal or thousands? `other` is the first reading */
    BH_SLIP_THOUSANDS,     /* 1 000, 1'000, 1,000,000 */
    BH_SLIP_POWER_OF_TEN   /* 7*10^13, 7x10^13, 7 10^13, 10^13, 7 e13 */
} bh_slip_kind;

typedef struct {
    bh_slip_kind kind;
    char fix[BH_PLAIN_SIZE];   /* the whole text as it should be, in plain form */
    char other[BH_PLAIN_SIZE]; /* BH_SLIP_COMMA only */
} bh_slip;

/* Looks at what follows the number `from` up to `to` in the plain text `whole`.  Returns whether it
 * is such a slip. */
bool bh_slip_find(const char *whole, const char *from, const char *to, bh_slip *out);

#endif
