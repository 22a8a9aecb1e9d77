/* background.c - the registry of backgrounds; a new one is one file and one row here. */
#include "beamhours/physics/background.h"

#include <string.h>

static const bh_background *const backgrounds[] = {
    &bh_background_quasi_elastic,
    &bh_background_inelastic,
    &bh_background_atomic,
    &bh_background_knock_on,
};

const bh_background *bh_background_at(int i)
{
    return i >= 0 && (size_t)i < sizeof backgrounds / sizeof backgrounds[0] ? backgrounds[i] : NULL;
}

const bh_background *bh_background_find(const char *name)
{
    const bh_background *row = NULL;
    for (int i = 0; name && (row = bh_background_at(i)) && strcmp(row->name, name) != 0; i++)
        ;
    return row;
}
