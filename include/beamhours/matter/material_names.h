/* material_names.h - what people call materials, and what the library calls them. */
#ifndef BH_MATTER_MATERIAL_NAMES_H
#define BH_MATTER_MATERIAL_NAMES_H

#include <stddef.h>

/* Room for the British spelling of a name [bytes]; longer names are left as they are. */
enum { BH_MATERIAL_NAME_SIZE = 64 };

/* `name` with the American spellings of elements and words turned British ("aluminum-7075" ->
 * "aluminium-7075"), in `out` or `name` itself. */
const char *bh_material_british(const char *name, char out[BH_MATERIAL_NAME_SIZE]);

/*
 * The one of the `count` known `names` that was probably meant by `name`: symbols, formulas and
 * short forms first ("LH2", "Al", "208Pb", "CH2"), then the nearest spelling.  NULL when none is
 * near.
 */
const char *bh_material_meant(const char *name, const char *const *names, size_t count);

#endif
