/* demos.c - the demonstration plans beside the program. */
#include "beamhours/command/demos.h"

#include <dirent.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sysexits.h>

#include "beamhours/base/file.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/places.h"
#include "beamhours/document/node.h"

static int by_name(const void *a, const void *b)
{
    return strcmp(*(char *const *)a, *(char *const *)b);
}

static void add_demo(bh_demos *d, const char *file)
{
    const size_t n = strlen(file);
    if (n > 5 && strcmp(file + n - 5, ".yaml") == 0 && d->count < BH_MOST_DEMOS) {
        char *name = bh_arena_take(d->arena, n - 4, 1);
        if (name) {
            memcpy(name, file, n - 5);
            d->name[d->count++] = name;
        }
    }
}

int bh_demos_find(bh_demos *d)
{
    char *data = bh_places_data();
    (void)snprintf(d->folder, sizeof d->folder, "%s/plans", data ? data : "");
    DIR *folder = data ? opendir(d->folder) : NULL;
    free(data);
    d->arena = folder ? bh_arena_new() : NULL;
    if (folder && !d->arena) {
        (void)closedir(folder);
        return bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
    }
    if (!folder) {
        fputs("beamhours: the demonstration plans are not beside the program: install it whole\n",
              stderr);
        return EX_NOINPUT;
    }
    for (const struct dirent *e = readdir(folder); e; e = readdir(folder))
        add_demo(d, e->d_name);
    (void)closedir(folder);
    qsort(d->name, d->count, sizeof d->name[0], by_name);
    return 0;
}

int bh_demos_read(const bh_demos *demos, size_t i, bh_text *out)
{
    char path[4400];
    bh_error err = {.code = BH_OK};
    (void)snprintf(path, sizeof path, "%s/%s.yaml", demos->folder, demos->name[i]);
    return bh_file_read(path, BH_DOCUMENT_LIMIT, out, &err) ? bh_complain(stderr, &err) : 0;
}

void bh_demos_title(const bh_text *bytes, bh_text *out)
{
    bh_diags *diags = bh_diags_new();
    bh_document *doc = diags ? bh_document_parse(bytes->bytes, bytes->length, "demo", diags) : NULL;
    const bh_node *title = doc ? bh_node_get(bh_document_root(doc), "title") : NULL;
    if (title && title->text)
        bh_text_append(out, title->text);
    bh_document_free(doc);
    bh_diags_free(diags);
}
