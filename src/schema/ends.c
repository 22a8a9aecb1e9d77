/* ends.c - the keys `from` and `to` of extents, ranges and sweeps. */
#include "beamhours/schema/ends.h"

static const char *example_of(bh_dimension dimension)
{
    switch ((int)dimension) {
    case BH_DIM_ENERGY:
    case BH_DIM_ENERGY_OR_PER_U:
        return "500 MeV";
    case BH_DIM_MOMENTUM:
        return "500 MeV/c";
    case BH_DIM_Q2:
        return "0.5 GeV2";
    case BH_DIM_CURRENT:
        return "10 uA";
    case BH_DIM_LENGTH:
        return "5 cm";
    case BH_DIM_SHARE:
        return "5 %";
    default:
        return "20 deg";
    }
}

bh_key bh_end_key(const bh_key *key, const char *name, size_t offset)
{
    return (bh_key){.name = name,
                    .kind = BH_KEY_QUANTITY,
                    .dimension = key->dimension,
                    .flags = BH_KEY_REQUIRED,
                    .least = key->least,
                    .above = key->above,
                    .most = key->most,
                    .offset = offset,
                    .example = example_of(key->dimension)};
}
