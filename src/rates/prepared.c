/* prepared.c - parts of acceptances made ready for sums. */
#include "beamhours/rates/prepared.h"

#include <stdint.h>
#include <string.h>

static void set_key(const bh_acceptance *a, int bin, double *key)
{
    const bh_acceptance_spec *s = &a->spec;
    const double numbers[BH_PREPARED_NUMBERS] = {(double)s->shape,
                                                 s->angle,
                                                 s->in_plane_from,
                                                 s->in_plane_to,
                                                 s->out_of_plane_from,
                                                 s->out_of_plane_to,
                                                 s->ring_from,
                                                 s->ring_to,
                                                 s->azimuth,
                                                 s->solid_angle,
                                                 bin ? bh_acceptance_edge(a, bin - 1) : -1e30,
                                                 bin ? bh_acceptance_edge(a, bin) : 1e30};
    memcpy(key, numbers, sizeof numbers);
}

static bool same_key(const double *a, const double *b)
{
    for (int i = 0; i < BH_PREPARED_NUMBERS; i++)
        if (a[i] != b[i])
            return false;
    return true;
}

/* Neighbouring bins, and the same bin of an arm that is moved, go to different places. */
static size_t place_of(const double *key, int bin)
{
    uint64_t bits;
    memcpy(&bits, &key[1], sizeof bits);
    bits *= 0x9e3779b97f4a7c15u;
    return ((size_t)(bits >> 40) + (size_t)bin) % BH_PREPARED_PARTS;
}

bh_prepared_part *bh_prepared_part_of(bh_prepared *prepared, const bh_acceptance *acceptance,
                                      int bin)
{
    double key[BH_PREPARED_NUMBERS];
    set_key(acceptance, bin, key);
    bh_prepared_part *p = &prepared->parts[place_of(key, bin)];
    if (p->used && same_key(p->key, key))
        return p;
    memcpy(p->key, key, sizeof key);
    p->used = true;
    p->moments.count = 0;
    bh_acceptance_part_of(acceptance, bin, &p->part);
    bh_quadrature_prepare(&p->part, &p->rule);
    return p;
}
