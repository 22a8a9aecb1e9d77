/* process.c - the registry of processes; a new one is one file and one row here. */
#include "beamhours/physics/process.h"

#include <string.h>

static const bh_process *const processes[] = {
    &bh_process_elastic,
};

const bh_process *bh_process_at(int i)
{
    return i >= 0 && (size_t)i < sizeof processes / sizeof processes[0] ? processes[i] : NULL;
}

const bh_process *bh_process_find(const char *name)
{
    const bh_process *row = NULL;
    for (int i = 0; name && (row = bh_process_at(i)) && strcmp(row->name, name) != 0; i++)
        ;
    return row;
}
