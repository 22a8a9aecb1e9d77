/* cmd_plans.c - beamhours plans, beamhours new: the demonstrations, and a first plan of one's own.
 */
#include <dirent.h>
#include <errno.h>
#include <stdlib.h>
#include <string.h>
#include <sysexits.h>
#include <unistd.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/file.h"
#include "beamhours/base/nearest.h"
#include "beamhours/command/blank_plan.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/document/node.h"

enum { MOST = 256, LIMIT = 1024 * 1024 };

/* Names of the demonstrations, sorted, without ".yaml". */
struct demos {
    char folder[4096];
    bh_arena *arena; /* of the names */
    char *name[MOST];
    size_t count;
};

static int by_name(const void *a, const void *b)
{
    return strcmp(*(char *const *)a, *(char *const *)b);
}

static void add_demo(struct demos *d, const char *file)
{
    const size_t n = strlen(file);
    if (n > 5 && strcmp(file + n - 5, ".yaml") == 0 && d->count < MOST) {
        char *name = bh_arena_take(d->arena, n - 4, 1);
        if (name) {
            memcpy(name, file, n - 5);
            d->name[d->count++] = name;
        }
    }
}

static int find_demos(struct demos *d)
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

/* Appends the text of demonstration `name`; 64 when there is none. */
static int read_demo(const bh_arguments *a, const struct demos *d, const char *name, bh_text *out)
{
    char path[4400], sentence[300];
    bh_error err = {.code = BH_OK};
    for (size_t i = 0; i < d->count; i++)
        if (strcmp(d->name[i], name) == 0) {
            (void)snprintf(path, sizeof path, "%s/%s.yaml", d->folder, name);
            return bh_file_read(path, LIMIT, out, &err) ? bh_complain(stderr, &err) : 0;
        }
    const char *near = bh_nearest(name, (const char *const *)d->name, d->count);
    (void)snprintf(sentence, sizeof sentence, "no demonstration \"%.100s\"; %s%s%s", name,
                   near ? "did you mean " : "`beamhours plans` lists them", near ? near : "",
                   near ? "?" : "");
    return bh_usage(a, sentence);
}

static void title_of(const bh_text *bytes, bh_text *out)
{
    bh_diags *diags = bh_diags_new();
    bh_document *doc = diags ? bh_document_parse(bytes->bytes, bytes->length, "demo", diags) : NULL;
    const bh_node *title = doc ? bh_node_get(bh_document_root(doc), "title") : NULL;
    if (title && title->text)
        bh_text_append(out, title->text);
    bh_document_free(doc);
    bh_diags_free(diags);
}

static int list(const bh_arguments *a, const struct demos *d, bh_text *out)
{
    for (size_t i = 0; i < d->count; i++) {
        bh_text bytes = {0};
        const int bad = read_demo(a, d, d->name[i], &bytes);
        if (bad)
            return bad;
        bh_text_appendf(out, "%-22s ", d->name[i]);
        title_of(&bytes, out);
        bh_text_append(out, "\n");
        bh_text_free(&bytes);
    }
    bh_text_append(
        out, "\nbeamhours plans NAME prints one, beamhours new FILE --like NAME copies it.\n");
    return 0;
}

int bh_cmd_plans(const bh_arguments *arguments)
{
    if (arguments->word_count > 1)
        return bh_usage(arguments, "takes one name at most");
    struct demos d = {.count = 0};
    bh_text out = {0};
    int status = find_demos(&d);
    if (status == 0)
        status = arguments->word_count ? read_demo(arguments, &d, arguments->words[0], &out)
                                       : list(arguments, &d, &out);
    if (status == 0)
        status = bh_output(&out, NULL);
    bh_text_free(&out);
    bh_arena_free(d.arena);
    return status;
}

int bh_cmd_new(const bh_arguments *arguments)
{
    if (arguments->word_count != 1)
        return bh_usage(arguments, "needs the name of the file to write");
    const char *path = arguments->words[0], *like = arguments->value[BH_OPT_LIKE];
    if (access(path, F_OK) == 0) {
        bh_print(stderr, "beamhours: new: %s exists and is left as it is: choose another name\n",
                 path);
        return EX_CANTCREAT;
    }
    struct demos d = {.count = 0};
    bh_text out = {0};
    int status = like ? find_demos(&d) : 0;
    if (status == 0 && like)
        status = read_demo(arguments, &d, like, &out);
    else if (status == 0)
        bh_text_append(&out, bh_blank_plan());
    if (status == 0)
        status = bh_output(&out, path);
    if (status == 0)
        printf("wrote %s; now: beamhours table %s\n", path, path);
    bh_text_free(&out);
    bh_arena_free(d.arena);
    return status;
}
