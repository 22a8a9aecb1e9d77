/* cmd_edit.c - beamhours edit [PLAN]: the terminal screen. */
#include <errno.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sysexits.h>
#include <unistd.h>
#ifdef __GLIBC__
#include <malloc.h>
#endif

#include "beamhours/base/arena.h"
#include "beamhours/command/blank_plan.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/demos.h"
#include "beamhours/command/options.h"
#include "beamhours/command/places.h"
#include "beamhours/screen/terminal.h"

static const char *copy(bh_arena *arena, const bh_text *text)
{
    char *own = bh_arena_take(arena, text->length + 1, 1);
    if (own && text->length)
        memcpy(own, text->bytes, text->length);
    return own ? own : "";
}

/* A short plan, and all demonstrations. */
static int beginnings(bh_demos *demos, bh_desk_start *start)
{
    int status = bh_demos_find(demos);
    bh_beginning *list =
        status ? NULL : bh_arena_take(demos->arena, demos->count + 1, sizeof *list);
    if (!status && !list)
        status = bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
    for (size_t i = 0; list && !status && i < demos->count; i++) {
        bh_text bytes = {0}, title = {0};
        status = bh_demos_read(demos, i, &bytes);
        bh_demos_title(&bytes, &title);
        list[i + 1] = (bh_beginning){.name = demos->name[i],
                                     .title = copy(demos->arena, &title),
                                     .bytes = copy(demos->arena, &bytes)};
        bh_text_free(&bytes);
        bh_text_free(&title);
    }
    if (!status && list)
        list[0] = (bh_beginning){"my-plan", "a short plan that already computes", bh_blank_plan()};
    start->beginnings = list;
    start->beginning_count = status ? 0 : demos->count + 1;
    return status;
}

/* What became of unsaved work when a signal ended the program. */
static void tell_kept(bh_desk *desk)
{
    const bh_rescue *rescue = bh_desk_rescue(desk);
    const bh_kept kept = bh_desk_secure(desk, 0);
    if (kept == BH_KEPT)
        fprintf(stderr, "beamhours: edit: unsaved work is kept in %s\n", bh_rescue_path(rescue));
    else if (kept == BH_KEPT_NOT)
        fprintf(stderr, "beamhours: edit: unsaved work is LOST: %s cannot be written: %s\n",
                bh_rescue_path(rescue),
                strerror(errno)); /* NOLINT(concurrency-mt-unsafe): this thread alone */
}

/* Where there is one, it is what TERM says that cannot do it. */
static void need_terminal(void)
{
    const char *name = getenv("TERM"); /* NOLINT(concurrency-mt-unsafe): nothing changes it */
    fputs("beamhours: edit: needs a terminal that can place its cursor and set text off", stderr);
    if (isatty(STDIN_FILENO) && isatty(STDOUT_FILENO) && name && name[0])
        fprintf(stderr, ", and TERM is %.60s", name);
    else if (isatty(STDIN_FILENO) && isatty(STDOUT_FILENO))
        fputs(", and TERM is not set", stderr);
    fputs("; `beamhours table` works without\n", stderr);
}

static int show(bh_desk *desk)
{
    int number = 0;
    switch (bh_terminal_run(desk, &number)) {
    case BH_TERMINAL_NONE:
        need_terminal();
        return EX_UNAVAILABLE;
    case BH_TERMINAL_SIGNAL:
        tell_kept(desk);
        return 128 + number; /* as a shell would say it */
    case BH_TERMINAL_DONE:
        break;
    }
    return 0;
}

static int edit(const bh_desk_start *start)
{
    bh_error err = {.code = BH_OK};
    bh_desk *desk = bh_desk_open(start, &err);
    const int status = desk ? show(desk) : bh_complain(stderr, &err);
    if (err.code == BH_EABSENT)
        fputs("`beamhours new` begins a plan, and so does `beamhours edit` without a name\n",
              stderr);
    bh_desk_close(desk);
    return status;
}

/* Every key reads a plan and lets another one go: their memory stays ours, as asking the system
 * for it again page by page takes longer than the reading. */
static void keep_memory(void)
{
#ifdef M_TRIM_THRESHOLD
    enum { MOST_KEPT = 64 << 20 }; /* bytes */
    (void)mallopt(M_TRIM_THRESHOLD, MOST_KEPT);
    (void)mallopt(M_MMAP_THRESHOLD, MOST_KEPT / 2);
#endif
}

int bh_cmd_edit(const bh_arguments *arguments)
{
    if (arguments->word_count > 1)
        return bh_usage(arguments, "takes one plan at most");
    keep_memory();
    bh_demos demos = {.count = 0};
    const char *path = arguments->word_count ? arguments->words[0] : NULL;
    char **folders = bh_places_materials(path);
    bh_desk_start start = {.path = path,
                           .folders = (const char *const *)folders,
                           .ascii = !bh_terminal_unicode() || arguments->value[BH_OPT_ASCII]};
    int status = folders ? 0 : bh_complain(stderr, &(bh_error){.code = BH_ENOMEM});
    if (!status && !path)
        status = beginnings(&demos, &start);
    if (!status)
        status = edit(&start);
    bh_arena_free(demos.arena);
    bh_places_free(folders);
    return status;
}
