/* dump.h - every value of a plan after defaults, in the keys' own names, for JSON and explain. */
#ifndef BH_PLAN_DUMP_H
#define BH_PLAN_DUMP_H

#include "beamhours/plan/plan.h"

/* Receives the plan piece by piece.  `key` is NULL for list items and the root. */
typedef struct {
    void (*begin_mapping)(void *to, const char *key);
    void (*begin_list)(void *to, const char *key);
    void (*end)(void *to);
    void (*text)(void *to, const char *key, const char *text); /* quantities as text: "20 uA" */
    void (*integer)(void *to, const char *key, long value);
} bh_dump_sink;

/* Walks the whole plan in the order of the key table; settings as they are after sweeps. */
void bh_plan_dump(const bh_plan *plan, const bh_dump_sink *sink, void *to);

#endif
