/* material.c - the library of materials: folders, look-up, what was read already. */
#include "beamhours/matter/material.h"

#include <dirent.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/file.h"
#include "beamhours/base/sentences.h"
#include "beamhours/base/text.h"
#include "beamhours/matter/material_file.h"
#include "beamhours/matter/material_names.h"
#include "beamhours/units/constants.h"

static const char suffix[] = ".yaml";
enum { SUFFIX = sizeof suffix - 1 };

/* Longer files are for the document's reader to refuse. */
static const size_t longest_file = (size_t)1 << 20; /* [bytes] */

/* One material that was asked for. */
typedef struct entry entry;
struct entry {
    entry *next;
    const char *name;            /* British, or the path as written */
    const bh_material *material; /* NULL when its file has errors */
    const char *file;
};

struct bh_material_library {
    bh_arena *arena;
    const char **folders; /* NULL-terminated */
    entry *read;
    const char **names; /* of bh_material_names; NULL while nobody asked */
    size_t name_count;
};

/* Where and under which key of a plan a material is asked for, and where complaints go. */
typedef struct {
    const char *name;
    bh_mark at;
    const char *key;
    bh_diags *diags;
} question;

static char *copy(bh_arena *arena, const char *text)
{
    const size_t size = strlen(text) + 1;
    char *out = bh_arena_take(arena, size, 1);
    if (out)
        memcpy(out, text, size);
    return out;
}

bh_material_library *bh_material_library_new(const char *const *folders)
{
    bh_arena *arena = bh_arena_new();
    bh_material_library *library = arena ? bh_arena_take(arena, 1, sizeof *library) : NULL;
    size_t count = 0;
    while (folders && folders[count])
        count++;
    const char **list = library ? bh_arena_take(arena, count + 1, sizeof *list) : NULL;
    bool good = list != NULL;
    for (size_t i = 0; good && i < count; i++) {
        list[i] = copy(arena, folders[i]);
        good = list[i] != NULL;
    }
    if (!good) {
        bh_arena_free(arena);
        return NULL;
    }
    library->arena = arena;
    library->folders = list;
    return library;
}

void bh_material_library_free(bh_material_library *library)
{
    if (library)
        bh_arena_free(library->arena);
}

static bool is_path(const char *name)
{
    const size_t length = strlen(name);
    return length > SUFFIX && strcmp(name + length - SUFFIX, suffix) == 0;
}

/* "FOLDER/NAME" and what ends it; a folder that is empty or absent is the current one. */
static bh_text path_of(const char *folder, const char *name, const char *end)
{
    bh_text path = {0};
    if (folder && folder[0] && name[0] != '/') {
        bh_text_append(&path, folder);
        if (folder[strlen(folder) - 1] != '/')
            bh_text_append(&path, "/");
    }
    bh_text_append(&path, name);
    bh_text_append(&path, end);
    return path;
}

/* Reads the file at `path` into the library's list.  Complaints of the file itself go to diags. */
static entry *take_in(bh_material_library *library, const question *q, const char *path,
                      const bh_text *bytes)
{
    entry *e = bh_arena_take(library->arena, 1, sizeof *e);
    bh_material *material = bh_arena_take(library->arena, 1, sizeof *material);
    if (e) {
        e->name = copy(library->arena, q->name);
        e->file = copy(library->arena, path);
    }
    if (!e || !material || !e->name || !e->file) {
        bh_diags_lose(q->diags);
        return NULL;
    }
    const bh_material_source source = {bytes->bytes ? bytes->bytes : "", bytes->length, q->name,
                                       path};
    const bh_code code = bh_material_read(&source, library->arena, q->diags, material);
    if (code == BH_ENOMEM)
        return NULL; /* not remembered: there may be memory another time */
    e->material = code ? NULL : material;
    e->next = library->read;
    library->read = e;
    return e;
}

/* A file named outright. */
static entry *read_path(bh_material_library *library, const question *q)
{
    bh_text path = path_of(library->folders[0], q->name, "");
    bh_text bytes = {0};
    bh_error err = {.code = BH_OK};
    entry *e = NULL;
    if (path.failed)
        bh_diags_lose(q->diags);
    else if (bh_file_read(path.bytes, longest_file, &bytes, &err))
        bh_diags_add(q->diags, BH_SEVERITY_ERROR, q->at, q->key, BH_SAY_MATERIAL_UNREAD, path.bytes,
                     err.text);
    else
        e = take_in(library, q, path.bytes, &bytes);
    bh_text_free(&path);
    bh_text_free(&bytes);
    return e;
}

static void say_unknown(bh_material_library *library, const question *q, const char *passed)
{
    size_t count;
    const char *const *names = bh_material_names(library, &count);
    const char *meant = names ? bh_material_meant(q->name, names, count) : NULL;
    if (passed)
        bh_diags_add(q->diags, BH_SEVERITY_ERROR, q->at, q->key, BH_SAY_NOT_A_MATERIAL, passed);
    else if (meant)
        bh_diags_add(q->diags, BH_SEVERITY_ERROR, q->at, q->key, BH_SAY_NO_MATERIAL_NEAR, q->name,
                     meant);
    else
        bh_diags_add(q->diags, BH_SEVERITY_ERROR, q->at, q->key, BH_SAY_NO_MATERIAL, q->name);
}

/* What looking into one folder came to. */
typedef enum { ABSENT, PASSED_OVER, UNREADABLE, FOUND } outcome;

static outcome look_into(bh_material_library *library, const question *q, const char *path,
                         entry **found)
{
    bh_text bytes = {0};
    bh_error err = {.code = BH_OK};
    outcome result = FOUND;
    const bh_code code = bh_file_read(path, longest_file, &bytes, &err);
    if (code == BH_EABSENT) {
        result = ABSENT;
    } else if (code) {
        bh_diags_add(q->diags, BH_SEVERITY_ERROR, q->at, q->key, BH_SAY_MATERIAL_UNREAD, path,
                     err.text);
        result = UNREADABLE;
    } else if (!bh_material_is_file(bytes.bytes ? bytes.bytes : "", bytes.length)) {
        result = PASSED_OVER; /* a plan of that name, perhaps: the next folder may have it */
    } else {
        *found = take_in(library, q, path, &bytes);
    }
    bh_text_free(&bytes);
    return result;
}

static entry *search(bh_material_library *library, const question *q)
{
    bh_text passed = {0};
    entry *found = NULL;
    outcome result = ABSENT;
    for (size_t i = 0; library->folders[i] && result < UNREADABLE && !strchr(q->name, '/'); i++) {
        bh_text path = path_of(library->folders[i], q->name, suffix);
        if (path.failed)
            bh_diags_lose(q->diags);
        else
            result = look_into(library, q, path.bytes, &found);
        if (result == PASSED_OVER && !passed.bytes)
            bh_text_append(&passed, path.bytes);
        bh_text_free(&path);
    }
    if (result < UNREADABLE)
        say_unknown(library, q, passed.bytes);
    bh_text_free(&passed);
    return found;
}

const bh_material *bh_material_find(bh_material_library *library, const char *name, bh_mark at,
                                    const char *key, bh_diags *diags)
{
    char british[BH_MATERIAL_NAME_SIZE];
    const bool path = is_path(name);
    const question q = {path ? name : bh_material_british(name, british), at, key, diags};
    entry *e = library->read;
    while (e && strcmp(e->name, q.name) != 0)
        e = e->next;
    if (!e)
        e = path ? read_path(library, &q) : search(library, &q);
    if (e && !e->material)
        bh_diags_add(diags, BH_SEVERITY_ERROR, at, key, BH_SAY_MATERIAL_BROKEN, e->file);
    return e ? e->material : NULL;
}

double bh_material_gas_density(const bh_material *material, double temperature, double pressure)
{
    if (!material || material->state != BH_STATE_GAS || !(temperature > 0.0) || !(pressure > 0.0))
        return 0.0;
    /* g/mol * Pa / (J/mol) is g/m3. */
    return material->molar_mass * pressure / (BH_BOLTZMANN_R * temperature) * 1e-6;
}

/* A growing list of names. */
typedef struct {
    const char **names;
    size_t count, room;
    bool failed;
} listing;

/* Makes room for one more; false without memory. */
static bool make_room(listing *to)
{
    if (to->count < to->room)
        return true;
    const size_t room = 2 * to->room + 64;
    void *more = realloc((void *)to->names, room * sizeof *to->names);
    if (!more)
        return false;
    to->names = more;
    to->room = room;
    return true;
}

static void list_name(bh_material_library *library, listing *to, const char *file)
{
    char *name = copy(library->arena, file);
    to->failed = to->failed || !name || !make_room(to);
    if (to->failed)
        return;
    name[strlen(name) - SUFFIX] = '\0';
    to->names[to->count++] = name;
}

/* Whether the file is a material and no plan. */
static bool holds_material(const char *folder, const char *file)
{
    bh_text path = path_of(folder, file, "");
    bh_text bytes = {0};
    const bool good = !path.failed &&
                      bh_file_read(path.bytes, longest_file, &bytes, NULL) == BH_OK &&
                      bytes.bytes && bh_material_is_file(bytes.bytes, bytes.length);
    bh_text_free(&path);
    bh_text_free(&bytes);
    return good;
}

static void list_folder(bh_material_library *library, listing *to, const char *folder)
{
    DIR *open = opendir(folder[0] ? folder : ".");
    if (!open)
        return; /* folders need not exist */
    for (struct dirent *item = readdir(open); item; item = readdir(open))
        if (item->d_name[0] != '.' && is_path(item->d_name) && holds_material(folder, item->d_name))
            list_name(library, to, item->d_name);
    (void)closedir(open);
}

static int by_name(const void *one, const void *two)
{
    return strcmp(*(const char *const *)one, *(const char *const *)two);
}

const char *const *bh_material_names(bh_material_library *library, size_t *count)
{
    listing list = {0};
    *count = library->name_count;
    if (library->names)
        return library->names;
    for (size_t i = 0; library->folders[i]; i++)
        list_folder(library, &list, library->folders[i]);
    const char **kept =
        list.failed ? NULL : bh_arena_take(library->arena, list.count + 1, sizeof *kept);
    if (kept && list.count > 0)
        qsort((void *)list.names, list.count, sizeof *list.names, by_name);
    for (size_t i = 0; kept && i < list.count; i++)
        if (i == 0 || strcmp(list.names[i], list.names[i - 1]) != 0)
            kept[library->name_count++] = list.names[i];
    free((void *)list.names);
    library->names = kept;
    *count = library->name_count;
    return kept;
}
