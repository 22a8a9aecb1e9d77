/* ends.h - the keys `from` and `to` of extents, ranges and sweeps. */
#ifndef BH_SCHEMA_ENDS_H
#define BH_SCHEMA_ENDS_H

#include "beamhours/schema/schema.h"

/* A row for a bh_value `name` at `offset` [bytes] that has the dimension and bounds of `key`. */
bh_key bh_end_key(const bh_key *key, const char *name, size_t offset);

#endif
