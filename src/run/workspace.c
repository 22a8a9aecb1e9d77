/* workspace.c - what evaluations may share: form factors made ready, cross sections summed. */
#include "beamhours/run/workspace.h"

#include <stdalign.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/arena.h"

enum { BUCKETS = 4096, MOST_BYTES = 8 << 20, MOST_STRUCTURES = 1024, ALIGN = alignof(max_align_t) };

struct entry {
    struct entry *next;
    size_t size; /* [bytes] of the key, at the beginning of data */
    size_t hash;
    size_t at; /* [bytes] from data to what is kept */
    alignas(max_align_t) unsigned char data[];
};

struct bh_workspace {
    bh_average_workspace *averages;
    bh_arena *arena; /* of entries and their contents */
    size_t bytes;
    bh_sum_scratch scratch;
    size_t structure_count;
    bh_structure *structures[MOST_STRUCTURES];
    struct entry *buckets[BUCKETS];
};

bh_workspace *bh_workspace_new(void)
{
    bh_workspace *w = calloc(1, sizeof *w);
    if (!w)
        return NULL;
    w->averages = bh_average_workspace_new();
    w->arena = bh_arena_new();
    if (w->averages && w->arena)
        return w;
    bh_workspace_free(w);
    return NULL;
}

static void forget(bh_workspace *w)
{
    for (size_t i = 0; i < w->structure_count; i++)
        bh_structure_free(w->structures[i]);
    w->structure_count = 0;
    memset(w->buckets, 0, sizeof w->buckets);
    bh_arena_free(w->arena);
    w->arena = NULL;
    w->bytes = 0;
}

void bh_workspace_free(bh_workspace *workspace)
{
    if (!workspace)
        return;
    forget(workspace);
    bh_average_workspace_free(workspace->averages);
    free(workspace);
}

void bh_workspace_trim(bh_workspace *workspace)
{
    if (workspace->bytes > MOST_BYTES || workspace->structure_count > MOST_STRUCTURES / 2)
        forget(workspace);
}

bh_average_workspace *bh_workspace_averages(bh_workspace *workspace)
{
    return workspace->averages;
}

bh_sum_scratch *bh_workspace_scratch(bh_workspace *workspace)
{
    return &workspace->scratch;
}

/* FNV-1a, Fowler, Noll and Vo. */
static size_t hash_of(const void *key, size_t size)
{
    const unsigned char *bytes = key;
    uint64_t hash = 14695981039346656037u;
    for (size_t i = 0; i < size; i++)
        hash = (hash ^ bytes[i]) * 1099511628211u;
    return (size_t)hash;
}

const void *bh_workspace_recall(const bh_workspace *workspace, const void *key, size_t size)
{
    const size_t hash = hash_of(key, size);
    for (const struct entry *e = workspace->buckets[hash % BUCKETS]; e; e = e->next)
        if (e->hash == hash && e->size == size && memcmp(e->data, key, size) == 0)
            return e->data + e->at;
    return NULL;
}

void *bh_workspace_keep(bh_workspace *workspace, const void *key, size_t size, size_t room)
{
    if (!workspace->arena)
        workspace->arena = bh_arena_new();
    const size_t at = (size + ALIGN - 1) / ALIGN * ALIGN;
    struct entry *e =
        workspace->arena ? bh_arena_take(workspace->arena, 1, sizeof *e + at + room) : NULL;
    if (!e)
        return NULL;
    const size_t hash = hash_of(key, size);
    e->size = size;
    e->hash = hash;
    e->at = at;
    memcpy(e->data, key, size);
    e->next = workspace->buckets[hash % BUCKETS];
    workspace->buckets[hash % BUCKETS] = e;
    workspace->bytes += sizeof *e + at + room;
    return e->data + at;
}

void bh_workspace_drop(bh_workspace *workspace, const void *key, size_t size)
{
    const size_t hash = hash_of(key, size);
    struct entry **e = &workspace->buckets[hash % BUCKETS];
    if (*e && (*e)->hash == hash && (*e)->size == size)
        *e = (*e)->next; /* its memory goes with the arena */
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
    const struct made *kept = bh_workspace_recall(workspace, &key, sizeof key);
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
    struct made *place = bh_workspace_keep(workspace, &key, sizeof key, sizeof *place);
    if (place)
        place->structure = made;
    else
        bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return place ? made : NULL;
}
