/* nuclide.h - masses, abundances and charge radii of nuclides; symbols of elements. */
#ifndef BH_UNITS_NUCLIDE_H
#define BH_UNITS_NUCLIDE_H

#include <stdbool.h>
#include <stddef.h>

typedef struct {
    int z, a;           /* 0, 1 is the neutron */
    double atomic_mass; /* [u] neutral atom; AME2020 */
    double mass;      /* [MeV] bare nucleus: atom - Z electrons + their binding; CODATA to A = 4 */
    double abundance; /* [1] atoms of this isotope among those of the element in nature; 0 none */
    double radius;    /* [fm] rms charge radius; 0 where none is published */
    double radius_sigma; /* [fm] its standard uncertainty */
    int twice_spin;      /* of the ground state; -1 not known */
    char name[8];        /* "208Pb" */
} bh_nuclide;

/* All of them, by rising z, then a.  Generated: see nuclides.csv for sources. */
extern const bh_nuclide bh_nuclide_table[];
extern const size_t bh_nuclide_table_size;

/* The nuclide, or NULL when the table lacks it.  Constant data: never freed. */
const bh_nuclide *bh_nuclide_find(int z, int a);

/* "208Pb", "1H", "1n" -> z, a, whether or not the table holds it (z <= a <= 299).  "Pb" -> z, a =
 * 0: the element.  False when neither; z and a are then left alone. */
bool bh_nuclide_parse(const char *name, int *z, int *a);

/* The nuclide that an unusual spelling ("Pb208", "208-Pb", "c-12", "C") probably means: for an
 * element its most abundant isotope.  NULL when nothing fits or the table lacks it. */
const bh_nuclide *bh_nuclide_suggest(const char *name);

/* Writes "208Pb" (or "Pb" for a = 0) into `out` of 8 characters; returns out.  An element that does
 * not exist is "?". */
char *bh_nuclide_name(int z, int a, char out[8]);

/* Symbol of element z ("Pb"; 1 <= z <= 118) or NULL; its z from the symbol or 0. */
const char *bh_element_symbol(int z);
int bh_element_z(const char *symbol);

/* Isotopes of z that the table holds, by rising a: the first, and how many; NULL and 0 for none. */
const bh_nuclide *bh_element_isotopes(int z, size_t *count);

/* Returns [u] the mean atomic mass of element z in nature, 0 where no isotope has an abundance. */
double bh_element_mass(int z);

#endif
