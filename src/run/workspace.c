/* workspace.c - what evaluations may share: form factors made ready, cross sections summed. */
#include "beamhours/run/workspace.h"

#include <math.h>
#include <stdalign.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/arena.h"
#include "beamhours/matter/radiation_length.h"

enum {
    BUCKETS = 4096,
    MOST_BYTES = 1 << 20, /* of sums: those of the settings at hand */
    MOST_STRUCTURES = 1024,
    MOST_RANGES = 512,
    ALIGN = alignof(max_align_t)
};

struct entry {
    struct entry *next;
    size_t size; /* [bytes] of the key, at the beginning of data */
    size_t hash;
    size_t at; /* [bytes] from data to what is kept */
    alignas(max_align_t) unsigned char data[];
};

/* A particle in a substance; the second needs the first. */
struct ranged {
    bh_stopping *stopping;
    bh_range *range;
};

/* Things kept by their keys. */
struct store {
    bh_arena *arena; /* of entries and their contents */
    size_t bytes;
    struct entry *buckets[BUCKETS];
};

struct bh_workspace {
    bh_average_workspace *averages;
    struct store sums; /* forgotten when there are many of them */
    struct store made; /* what points to structures and ranges, and matter: as long as these */
    size_t numbers;
    bh_sum_scratch scratch;
    size_t structure_count;
    bh_structure *structures[MOST_STRUCTURES];
    size_t range_count;
    struct ranged ranges[MOST_RANGES];
};

bh_workspace *bh_workspace_new(void)
{
    bh_workspace *w = calloc(1, sizeof *w);
    if (!w)
        return NULL;
    w->averages = bh_average_workspace_new();
    w->sums.arena = bh_arena_new();
    w->made.arena = bh_arena_new();
    if (w->averages && w->sums.arena && w->made.arena)
        return w;
    bh_workspace_free(w);
    return NULL;
}

static void empty(struct store *s)
{
    memset(s->buckets, 0, sizeof s->buckets);
    if (s->arena)
        bh_arena_clear(s->arena);
    s->bytes = 0;
}

/* Sums name structures and ranges: they go with them. */
static void forget(bh_workspace *w)
{
    for (size_t i = 0; i < w->structure_count; i++)
        bh_structure_free(w->structures[i]);
    w->structure_count = 0;
    for (size_t i = 0; i < w->range_count; i++) {
        bh_range_free(w->ranges[i].range);
        bh_stopping_free(w->ranges[i].stopping);
    }
    w->range_count = 0;
    empty(&w->made);
    empty(&w->sums);
}

void bh_workspace_free(bh_workspace *workspace)
{
    if (!workspace)
        return;
    forget(workspace);
    bh_arena_free(workspace->sums.arena);
    bh_arena_free(workspace->made.arena);
    bh_average_workspace_free(workspace->averages);
    free(workspace);
}

void bh_workspace_trim(bh_workspace *workspace)
{
    if (workspace->structure_count > MOST_STRUCTURES / 2 ||
        workspace->range_count > MOST_RANGES / 2)
        forget(workspace);
    else if (workspace->sums.bytes > MOST_BYTES)
        empty(&workspace->sums);
}

bh_average_workspace *bh_workspace_averages(bh_workspace *workspace)
{
    return workspace->averages;
}

bh_sum_scratch *bh_workspace_scratch(bh_workspace *workspace)
{
    return &workspace->scratch;
}

static uint64_t mixed(uint64_t hash, uint64_t word)
{
    hash = (hash ^ word) * 1099511628211u;
    return hash ^ hash >> 29;
}

/* FNV-1a, Fowler, Noll and Vo, by words of 8 bytes: keys are long, and hashed again and again. */
static size_t hash_of(const void *key, size_t size)
{
    const unsigned char *bytes = key;
    uint64_t hash = 14695981039346656037u, word;
    size_t i = 0;
    for (; i + sizeof word <= size; i += sizeof word) {
        memcpy(&word, bytes + i, sizeof word);
        hash = mixed(hash, word);
    }
    for (; i < size; i++)
        hash = mixed(hash, bytes[i]);
    return (size_t)(hash ^ hash >> 32);
}

static const void *recall(const struct store *store, const void *key, size_t size)
{
    const size_t hash = hash_of(key, size);
    for (const struct entry *e = store->buckets[hash % BUCKETS]; e; e = e->next)
        if (e->hash == hash && e->size == size && memcmp(e->data, key, size) == 0)
            return e->data + e->at;
    return NULL;
}

static void *keep(struct store *store, const void *key, size_t size, size_t room)
{
    const size_t at = (size + ALIGN - 1) / ALIGN * ALIGN;
    struct entry *e = bh_arena_take(store->arena, 1, sizeof *e + at + room);
    if (!e)
        return NULL;
    const size_t hash = hash_of(key, size);
    e->size = size;
    e->hash = hash;
    e->at = at;
    memcpy(e->data, key, size);
    e->next = store->buckets[hash % BUCKETS];
    store->buckets[hash % BUCKETS] = e;
    store->bytes += sizeof *e + at + room;
    return e->data + at;
}

const void *bh_workspace_recall(const bh_workspace *workspace, const void *key, size_t size)
{
    return recall(&workspace->sums, key, size);
}

void *bh_workspace_keep(bh_workspace *workspace, const void *key, size_t size, size_t room)
{
    return keep(&workspace->sums, key, size, room);
}

void bh_workspace_drop(bh_workspace *workspace, const void *key, size_t size)
{
    const size_t hash = hash_of(key, size);
    struct entry **e = &workspace->sums.buckets[hash % BUCKETS];
    if (*e && (*e)->hash == hash && (*e)->size == size)
        *e = (*e)->next; /* its memory goes with the arena */
}

size_t bh_workspace_number(bh_workspace *workspace, unsigned char *key)
{
    workspace->numbers++;
    memcpy(key, &workspace->numbers, sizeof workspace->numbers);
    return sizeof workspace->numbers;
}

/* What a structure is kept under; bytes between members are zero. */
struct wanted {
    int z, a;
    char name[48];
};

struct made {
    bh_structure *structure;
};

const bh_structure *bh_workspace_structure(bh_workspace *workspace, const char *name, int z, int a,
                                           bh_error *err)
{
    struct wanted key;
    memset(&key, 0, sizeof key);
    key.z = z;
    key.a = a;
    strncpy(key.name, name ? name : "", sizeof key.name - 1);
    const struct made *kept = recall(&workspace->made, &key, sizeof key);
    if (kept)
        return kept->structure;
    if (workspace->structure_count == MOST_STRUCTURES) {
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    bh_structure *made = bh_structure_new(name, z, a, err);
    if (!made)
        return NULL;
    workspace->structures[workspace->structure_count++] = made;
    struct made *place = keep(&workspace->made, &key, sizeof key, sizeof *place);
    if (place)
        place->structure = made;
    else
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return place ? made : NULL;
}

/* A material by value, so that nothing kept depends on whether it still exists. */
struct material_key {
    char name[48];
    int state, count;
    double mean_atomic_mass, density, published_x0, composition;
    bh_density_effect effect;
};

static void name_material(const bh_material *m, struct material_key *key)
{
    memset(key, 0, sizeof *key);
    strncpy(key->name, m->name ? m->name : "", sizeof key->name - 1);
    key->state = (int)m->state;
    key->count = (int)m->count;
    key->mean_atomic_mass = m->mean_atomic_mass;
    key->density = m->density;
    key->published_x0 = m->published_x0;
    key->effect = m->effect;
    for (size_t i = 0; i < m->count; i++)
        key->composition += m->parts[i].per_atom * (m->parts[i].z + 0.01 * m->parts[i].a);
}

struct matter_key {
    char what[8];
    struct material_key material;
};

const bh_matter *bh_workspace_matter(bh_workspace *workspace, const bh_material *material,
                                     bh_error *err)
{
    struct matter_key key;
    memset(&key, 0, sizeof key);
    memcpy(key.what, "matter", 6);
    name_material(material, &key.material);
    const bh_matter *known = recall(&workspace->made, &key, sizeof key);
    if (known)
        return known;
    bh_matter *made = keep(&workspace->made, &key, sizeof key, sizeof *made);
    if (!made) {
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    const bh_radiation_length length = bh_radiation_length_of(material);
    double z = 0;
    for (size_t i = 0; i < material->count; i++)
        z += material->parts[i].per_atom * material->parts[i].z;
    *made = (bh_matter){.length = length.value,
                        .b = length.b,
                        .z_over_a = material->count ? z / material->mean_atomic_mass : 0};
    return made;
}

struct range_key {
    char what[8], particle[16];
    double density, top;
    struct material_key material;
};

/* Tables are made a little further than needed, so that neighbours share one. */
static double top_for(double kinetic)
{
    static const double most = 1e7; /* of bh_range_new, MeV */
    int exponent;
    frexp(kinetic * 1.001, &exponent);
    return fmin(fmax(ldexp(1, exponent), 1), fmax(most, kinetic));
}

static bh_code make_range(const bh_particle *particle, const bh_substance *in, double top,
                          struct ranged *made, bh_error *err)
{
    const bh_losing losing = bh_particle_is_electron(particle) ? BH_LOSE_COLLISION : BH_LOSE_ALL;
    bh_code code = bh_stopping_new(particle, in->material, in->density, &made->stopping, err);
    if (code)
        return code;
    code = bh_range_new(made->stopping, losing, top, &made->range, err);
    if (code)
        bh_stopping_free(made->stopping);
    return code;
}

const bh_range *bh_workspace_range(bh_workspace *workspace, const bh_particle *particle,
                                   const bh_substance *in, double kinetic, bh_error *err)
{
    struct range_key key;
    memset(&key, 0, sizeof key);
    memcpy(key.what, "range", 5);
    memcpy(key.particle, particle->name, sizeof key.particle);
    key.density = in->density;
    key.top = top_for(kinetic);
    name_material(in->material, &key.material);
    const struct ranged *known = recall(&workspace->made, &key, sizeof key);
    if (known)
        return known->range;
    struct ranged made;
    if (workspace->range_count == MOST_RANGES) {
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
        return NULL;
    }
    if (make_range(particle, in, key.top, &made, err))
        return NULL;
    workspace->ranges[workspace->range_count++] = made;
    struct ranged *place = keep(&workspace->made, &key, sizeof key, sizeof *place);
    if (place)
        *place = made;
    else
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return place ? made.range : NULL;
}
