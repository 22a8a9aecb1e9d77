/* cmd_compare.c - beamhours compare PLAN PLAN: what changed between two plans. */
#include <string.h>
#include <sysexits.h>

#include "beamhours.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/report/differences.h"

static bh_code render(const char *format, const bh_comparison *c, bh_text *out)
{
    if (strcmp(format, "json") == 0)
        return bh_comparison_json(c, out);
    if (strcmp(format, "markdown") == 0)
        bh_comparison_markdown(c, out);
    else
        bh_comparison_text(c, bh_places_width(), out);
    return BH_OK;
}

static int show(const bh_arguments *arguments, const char *format, const bh_input *before,
                const bh_input *after)
{
    bh_arena *arena = bh_arena_new();
    bh_differences inputs = {0};
    bh_text out = {0};
    bh_error err = {.code = BH_ENOMEM};
    bh_code bad =
        arena ? bh_differences_find(before->plan, after->plan, arena, &inputs, &err) : BH_ENOMEM;
    if (!bad)
        bad = render(format, &(bh_comparison){before->table, after->table, &inputs, bh_version()},
                     &out);
    err.code = bad;
    if (!bad) {
        bh_say_diags(stderr, bh_table_warnings(before->table));
        bh_say_diags(stderr, bh_table_warnings(after->table));
    }
    const int status =
        bad ? bh_complain(stderr, &err) : bh_output(&out, arguments->value[BH_OPT_OUTPUT]);
    bh_text_free(&out);
    bh_arena_free(arena);
    return status;
}

int bh_cmd_compare(const bh_arguments *arguments)
{
    const char *format = bh_arguments_format(arguments, BH_OPT_COMPARE_FORMAT);
    bh_input before = {0}, after = {0};
    if (!format)
        return EX_USAGE;
    if (arguments->word_count != 2)
        return bh_usage(arguments, "needs two plans: the one before and the one after");
    if (strcmp(arguments->words[0], "-") == 0 && strcmp(arguments->words[1], "-") == 0)
        return bh_usage(arguments, "standard input can be one of the two plans, not both");
    int status =
        bh_input_table(arguments->words[0], arguments, &(bh_evaluation){.bins = false}, &before);
    if (status == 0)
        status =
            bh_input_table(arguments->words[1], arguments, &(bh_evaluation){.bins = false}, &after);
    if (status == 0)
        status = show(arguments, format, &before, &after);
    bh_input_close(&before);
    bh_input_close(&after);
    return status;
}
