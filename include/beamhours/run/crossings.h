/* crossings.h - the matter on both sides of collisions, depth by depth, at one angle. */
#ifndef BH_RUN_CROSSINGS_H
#define BH_RUN_CROSSINGS_H

#include "beamhours/run/passage.h"

typedef struct {
    double weight; /* [1] as of vertices */
    bh_crossed before, after;
} bh_crossing;

enum { BH_MOST_CROSSINGS = 2 * BH_VERTICES_PER_LAYER };

/*
 * Fills `out` (room for BH_MOST_CROSSINGS) for particles that leave `count` vertices at polar
 * `angle` [rad] and returns how many.  Where they leave by the wall from one side of a depth and by
 * a face from the other, layers are cut there, for the ways differ; of very many vertices some
 * stand for all.
 */
size_t bh_crossings_at(const bh_way *way, const bh_vertex *vertices, size_t count, double angle,
                       bh_crossing *out);

#endif
