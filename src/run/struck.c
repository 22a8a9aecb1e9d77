/* struck.c - the nuclei of a target: which nuclides, in which layers, signal or background. */
#include "beamhours/run/struck.h"

struct making {
    const bh_target *target;
    bh_struck *nuclides;
    size_t count;
    bh_presence *presences;
    size_t presence_count;
};

static bh_origin origin_of(const bh_target *target, bh_role role, const bh_constituent *part)
{
    if (role == BH_ROLE_WINDOW)
        return BH_ORIGIN_WINDOW;
    const bool scatterer = part->z == target->scatterer_z &&
                           (target->scatterer_a == 0 || part->a == target->scatterer_a);
    return role == BH_ROLE_SAMPLE && scatterer ? BH_ORIGIN_SIGNAL : BH_ORIGIN_OTHER;
}

static size_t number_of(struct making *m, const bh_constituent *part)
{
    for (size_t i = 0; i < m->count; i++)
        if (m->nuclides[i].z == part->z && m->nuclides[i].a == part->a)
            return i;
    m->nuclides[m->count] = (bh_struck){.z = part->z, .a = part->a, .mass = part->mass};
    return m->count++;
}

static void add_layer(struct making *m, size_t layer)
{
    const bh_layer *l = &m->target->layers[layer];
    for (size_t i = 0; i < l->material->count; i++) {
        const bh_constituent *part = &l->material->parts[i];
        const double number = l->areal_number.value * part->per_atom;
        if (number > 0)
            m->presences[m->presence_count++] =
                (bh_presence){.layer = layer,
                              .nuclide = number_of(m, part),
                              .origin = origin_of(m->target, l->role, part),
                              .number = number};
    }
}

/* Of the isotopes of the scatterer, the one with most nuclei in the samples. */
static size_t main_of(const struct making *m, double *sums)
{
    size_t best = 0;
    for (size_t i = 0; i < m->presence_count; i++) {
        const bh_presence *p = &m->presences[i];
        if (p->origin != BH_ORIGIN_SIGNAL)
            continue;
        sums[p->nuclide] += p->number;
        if (sums[p->nuclide] > sums[best])
            best = p->nuclide;
    }
    return best;
}

bool bh_struck_from_target(const bh_target *target, bh_arena *arena, bh_struck_list *list)
{
    size_t most = 1;
    for (size_t l = 0; l < target->layer_count; l++)
        most += target->layers[l].material->count;
    struct making m = {.target = target};
    m.nuclides = bh_arena_take(arena, most, sizeof *m.nuclides);
    m.presences = bh_arena_take(arena, most, sizeof *m.presences);
    double *sums = bh_arena_take(arena, most, sizeof *sums);
    if (!m.nuclides || !m.presences || !sums)
        return false;
    for (size_t l = 0; l < target->layer_count; l++)
        add_layer(&m, l);
    *list = (bh_struck_list){.target = target,
                             .count = m.count,
                             .nuclides = m.nuclides,
                             .presence_count = m.presence_count,
                             .presences = m.presences,
                             .main = main_of(&m, sums)};
    return true;
}
