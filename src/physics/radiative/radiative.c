/* radiative.c - the registry of internal radiative corrections; a new one is one file and one row
 * here. */
#include "beamhours/physics/radiative.h"

#include <string.h>

static void unity(const bh_encounter *encounter, double cut, size_t n, const bh_event *event,
                  double *factor)
{
    (void)encounter;
    (void)cut;
    (void)event;
    for (size_t i = 0; i < n; i++)
        factor[i] = 1.0;
}

static const bh_radiative models[] = {
    {"none", "no radiation: the cross section as it stands", "definition",
     "heavy particles; electrons lose 5 to 30 % to radiation", unity},
};

const bh_radiative *bh_radiative_at(int i)
{
    return i >= 0 && (size_t)i < sizeof models / sizeof models[0] ? &models[i] : NULL;
}

const bh_radiative *bh_radiative_find(const char *name)
{
    const bh_radiative *row = &models[0];
    if (!name || strcmp(name, "default") == 0)
        return row;
    for (int i = 0; (row = bh_radiative_at(i)) && strcmp(row->name, name) != 0; i++)
        ;
    return row;
}
