/* columns.c - the one list of what a run table says. */
#include "beamhours/run/columns.h"

#include <stddef.h>
#include <string.h>

enum { LONGEST = 64, FORGIVEN = 6 };

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

static int least(int a, int b)
{
    return a < b ? a : b;
}

/* Insertions, deletions and replacements between two short words. */
static int edits(const char *a, const char *b)
{
    int row[LONGEST + 1];
    const int length = (int)strlen(b);
    for (int j = 0; j <= length; j++)
        row[j] = j;
    for (int i = 1; a[i - 1]; i++) {
        int corner = row[0];
        row[0] = i;
        for (int j = 1; j <= length; j++) {
            const int replaced = corner + (a[i - 1] != b[j - 1]);
            corner = row[j];
            row[j] = least(replaced, 1 + least(row[j], row[j - 1]));
        }
    }
    return row[length];
}

/* A key without its unit ("angle", "counts") is the likeliest slip of all. */
const char *bh_column_suggest(const char *key)
{
    const size_t length = strlen(key);
    if (length == 0 || length > LONGEST)
        return NULL;
    const char *best = NULL;
    int fewest = FORGIVEN + 1;
    for (int i = 0; i < BH_COLUMN_COUNT; i++) {
        if (strncmp(table[i].key, key, length) == 0)
            return table[i].key;
        const int n = edits(key, table[i].key);
        if (n < fewest && n <= (int)length / 2) {
            fewest = n;
            best = table[i].key;
        }
    }
    return best;
}
