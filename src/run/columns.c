/* columns.c - the one list of what a run table says. */
#include "beamhours/run/columns.h"

#include <stddef.h>
#include <string.h>

#include "beamhours/base/nearest.h"

static const bh_column table[BH_COLUMN_COUNT] = {
#define COLUMN(id, key, kind, heading, unit, digits, meaning) \
    [id] = {key, heading, unit, meaning, kind, digits},
    BH_COLUMNS(COLUMN)
#undef COLUMN
};

const bh_column *bh_column_at(int id)
{
    return id >= 0 && id < BH_COLUMN_COUNT ? &table[id] : NULL;
}

int bh_column_find(const char *key)
{
    for (int i = 0; i < BH_COLUMN_COUNT; i++)
        if (strcmp(table[i].key, key) == 0)
            return i;
    return -1;
}

const char *bh_column_suggest(const char *key)
{
    const char *keys[BH_COLUMN_COUNT];
    for (int i = 0; i < BH_COLUMN_COUNT; i++)
        keys[i] = table[i].key;
    return bh_nearest(key, keys, BH_COLUMN_COUNT);
}
