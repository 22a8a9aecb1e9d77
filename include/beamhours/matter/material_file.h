/* material_file.h - one file of the library of materials, read and checked. */
#ifndef BH_MATTER_MATERIAL_FILE_H
#define BH_MATTER_MATERIAL_FILE_H

#include <stdbool.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/diag.h"
#include "beamhours/matter/material.h"

typedef struct {
    const char *bytes;
    size_t length;    /* [bytes] */
    const char *name; /* what a plan calls it */
    const char *file; /* where it was found, for complaints */
} bh_material_source;

/* Whether the text begins, after comments, with the key `material`: a plan beside the material of
 * the same name does not. */
bool bh_material_is_file(const char *bytes, size_t length);

/*
 * Reads a material into `out`, whose strings and lists belong to `arena` or are constant.  All
 * errors and warnings go to `diags` with marks of source->file.
 * Returns BH_OK; BH_EPLAN when there was an error; BH_ENOMEM (also noted in diags).
 */
BH_CHECKED bh_code bh_material_read(const bh_material_source *source, bh_arena *arena,
                                    bh_diags *diags, bh_material *out);

#endif
