/* cmd_plans.c - beamhours plans, beamhours new: the demonstrations, and a first plan of one's own.
 */
#include <stdlib.h>
#include <string.h>
#include <sysexits.h>
#include <unistd.h>

#include "beamhours/base/arena.h"
#include "beamhours/base/nearest.h"
#include "beamhours/command/blank_plan.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/demos.h"
#include "beamhours/command/input.h"

/* Appends the text of demonstration `name`; 64 when there is none. */
static int read_demo(const bh_arguments *a, const bh_demos *d, const char *name, bh_text *out)
{
    char sentence[300];
    for (size_t i = 0; i < d->count; i++)
        if (strcmp(d->name[i], name) == 0)
            return bh_demos_read(d, i, out);
    const char *near = bh_nearest(name, (const char *const *)d->name, d->count);
    (void)snprintf(sentence, sizeof sentence, "no demonstration \"%.100s\"; %s%s%s", name,
                   near ? "did you mean " : "`beamhours plans` lists them", near ? near : "",
                   near ? "?" : "");
    return bh_usage(a, sentence);
}

static int list(const bh_arguments *a, const bh_demos *d, bh_text *out)
{
    for (size_t i = 0; i < d->count; i++) {
        bh_text bytes = {0};
        const int bad = read_demo(a, d, d->name[i], &bytes);
        if (bad)
            return bad;
        bh_text_appendf(out, "%-22s ", d->name[i]);
        bh_demos_title(&bytes, out);
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
    bh_demos d = {.count = 0};
    bh_text out = {0};
    int status = bh_demos_find(&d);
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
    bh_demos d = {.count = 0};
    bh_text out = {0};
    int status = like ? bh_demos_find(&d) : 0;
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
