/* diag.c - everything there is to say about a document. */
#include "beamhours/base/diag.h"

#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/arena.h"

struct entry {
    bh_diag diag;       /* first, so that a pointer to it serves for both */
    struct entry *next; /* with the same hash */
    size_t file, nr;    /* which file, and which entry, in order of appearance */
};

struct bh_diags {
    bh_arena *arena;
    struct entry **entries;
    const char **files; /* every name that appeared, once; a missing one too */
    size_t count, room, errors, file_count, file_room;
    struct entry **hashed; /* `buckets` chains of the first `known` entries; NULL: not asked for */
    size_t buckets, known;
    bool lost; /* memory ran out: `loss` stands for what is missing */
    bh_diag loss;
};

bh_diags *bh_diags_new(void)
{
    bh_diags *diags = calloc(1, sizeof *diags);
    if (!diags)
        return NULL;
    diags->arena = bh_arena_new();
    if (!diags->arena) {
        free(diags);
        return NULL;
    }
    diags->loss = (bh_diag){BH_SEVERITY_ERROR, {NULL, 0, 0}, "plan", bh_code_text(BH_ENOMEM)};
    return diags;
}

void bh_diags_free(bh_diags *diags)
{
    if (!diags)
        return;
    bh_arena_free(diags->arena);
    free(diags->entries);
    free(diags->files);
    free(diags->hashed);
    free(diags);
}

/* `array` with room for one more than `count` things of `size` bytes; NULL leaves it as it was. */
static void *with_room(void *array, size_t count, size_t *room, size_t size)
{
    if (count < *room)
        return array;
    const size_t more = *room ? 2 * *room : 16;
    void *grown = realloc(array, more * size);
    if (grown)
        *room = more;
    return grown;
}

static const char *copy(bh_arena *arena, const char *text)
{
    const size_t size = strlen(text) + 1;
    char *own = bh_arena_take(arena, size, 1);
    return own ? memcpy(own, text, size) : NULL;
}

static bool same_name(const char *a, const char *b)
{
    return a && b ? strcmp(a, b) == 0 : a == b;
}

/* The number of the file called `name`, known or new; false when memory ran out. */
static bool find_file(bh_diags *diags, const char *name, size_t *nr)
{
    for (*nr = 0; *nr < diags->file_count; ++*nr)
        if (same_name(diags->files[*nr], name))
            return true;
    const char **files =
        with_room(diags->files, diags->file_count, &diags->file_room, sizeof *files);
    if (!files)
        return false;
    diags->files = files;
    const char *own = name ? copy(diags->arena, name) : NULL;
    if (name && !own)
        return false;
    diags->files[diags->file_count++] = own;
    return true;
}

static char *print(bh_arena *arena, const char *fmt, va_list args) BH_PRINTF(2, 0);

static char *print(bh_arena *arena, const char *fmt, va_list args)
{
    va_list again;
    va_copy(again, args);
    const int length = vsnprintf(NULL, 0, fmt, args);
    char *text = length < 0 ? NULL : bh_arena_take(arena, (size_t)length + 1, 1);
    if (text)
        (void)vsnprintf(text, (size_t)length + 1, fmt, again);
    va_end(again);
    return text;
}

/* A new last entry with its place and key filled in, or NULL. */
static struct entry *append(bh_diags *diags, bh_mark at, const char *key)
{
    struct entry **entries =
        with_room(diags->entries, diags->count, &diags->room, sizeof(struct entry *));
    if (!entries)
        return NULL;
    diags->entries = entries;
    struct entry *e = bh_arena_take(diags->arena, 1, sizeof *e);
    if (!e || !find_file(diags, at.file, &e->file))
        return NULL;
    e->diag.at = at;
    e->diag.at.file = diags->files[e->file];
    e->diag.key = copy(diags->arena, key && *key ? key : "plan");
    return e->diag.key ? e : NULL;
}

void bh_diags_addv(bh_diags *diags, bh_severity severity, bh_mark at, bh_said said)
{
    struct entry *e = append(diags, at, said.key);
/* The functions that fill a bh_said have their formats checked. */
#pragma GCC diagnostic push
#pragma GCC diagnostic ignored "-Wformat-nonliteral"
    char *text = e ? print(diags->arena, said.fmt, *said.args) : NULL;
#pragma GCC diagnostic pop
    if (!text) {
        diags->lost = true;
        return;
    }
    e->diag.severity = severity;
    e->diag.text = text;
    e->nr = diags->count;
    diags->entries[diags->count++] = e;
    diags->errors += severity == BH_SEVERITY_ERROR;
}

void bh_diags_add(bh_diags *diags, bh_severity severity, bh_mark at, const char *key,
                  const char *fmt, ...)
{
    va_list args;
    va_start(args, fmt);
    bh_diags_addv(diags, severity, at, (bh_said){key, fmt, &args});
    va_end(args);
}

void bh_diags_lose(bh_diags *diags)
{
    diags->lost = true;
}

void bh_diags_expect(bh_diags *diags, const char *name)
{
    size_t nr;
    if (!find_file(diags, name, &nr))
        diags->lost = true;
}

size_t bh_diags_count(const bh_diags *diags)
{
    return diags->count + diags->lost;
}

size_t bh_diags_errors(const bh_diags *diags)
{
    return diags->errors + diags->lost;
}

const bh_diag *bh_diags_at(const bh_diags *diags, size_t i)
{
    return i < diags->count ? &diags->entries[i]->diag : &diags->loss;
}

/* --- told already? --- */

static size_t hash_of(bh_mark at, const char *text)
{
    size_t hash = (size_t)at.line * 31U + (size_t)at.column;
    for (const char *c = text; *c; c++)
        hash = hash * 31U + (unsigned char)*c;
    return hash;
}

static void note_entry(bh_diags *diags, struct entry *e)
{
    struct entry **chain = &diags->hashed[hash_of(e->diag.at, e->diag.text) % diags->buckets];
    e->next = *chain;
    *chain = e;
}

/* Brings the chains up to date; false without memory. */
static bool know_all(bh_diags *diags)
{
    if (!diags->hashed || diags->count > 2 * diags->buckets) {
        const size_t buckets = diags->buckets ? 4 * diags->buckets : 256;
        free(diags->hashed);
        diags->hashed = calloc(buckets, sizeof(struct entry *));
        diags->buckets = diags->hashed ? buckets : 0;
        diags->known = 0;
    }
    if (!diags->hashed)
        return false;
    while (diags->known < diags->count)
        note_entry(diags, diags->entries[diags->known++]);
    return true;
}

bool bh_diags_told(bh_diags *diags, bh_mark at, const char *text)
{
    if (!know_all(diags)) {
        diags->lost = true;
        return false;
    }
    for (const struct entry *e = diags->hashed[hash_of(at, text) % diags->buckets]; e; e = e->next)
        if (e->diag.at.line == at.line && e->diag.at.column == at.column &&
            same_name(e->diag.at.file, at.file) && strcmp(e->diag.text, text) == 0)
            return true;
    return false;
}

static int order(size_t a, size_t b)
{
    return (a > b) - (a < b);
}

static int by_place(const void *left, const void *right)
{
    const struct entry *a = *(struct entry *const *)left, *b = *(struct entry *const *)right;
    int way = order(a->file, b->file);
    if (way == 0)
        way = (a->diag.at.line > b->diag.at.line) - (a->diag.at.line < b->diag.at.line);
    if (way == 0)
        way = (a->diag.at.column > b->diag.at.column) - (a->diag.at.column < b->diag.at.column);
    return way ? way : order(a->nr, b->nr); /* qsort alone would not keep equal ones in order */
}

void bh_diags_sort(bh_diags *diags)
{
    free(diags->hashed); /* it knows entries by their number */
    diags->hashed = NULL;
    diags->buckets = 0;
    if (diags->count > 1)
        qsort(diags->entries, diags->count, sizeof(struct entry *), by_place);
}
