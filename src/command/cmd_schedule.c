/* cmd_schedule.c - beamhours schedule PLAN: settings in run order, with a running clock. */
#include <string.h>
#include <sysexits.h>

#include "beamhours.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/report/run_schedule.h"
#include "beamhours/report/wall_clock.h"

static bh_code render(const char *format, const bh_run_schedule *s, bh_text *out)
{
    if (strcmp(format, "json") == 0)
        return bh_run_schedule_json(s, out);
    if (strcmp(format, "csv") == 0)
        bh_run_schedule_csv(s, out);
    else if (strcmp(format, "markdown") == 0)
        bh_run_schedule_markdown(s, out);
    else
        bh_run_schedule_text(s, bh_places_width(), out);
    return BH_OK;
}

static int show(const bh_arguments *arguments, const char *format, const bh_table *table,
                bh_run_schedule *s)
{
    bh_arena *arena = bh_arena_new();
    bh_text out = {0};
    bh_error err = {.code = BH_ENOMEM};
    bh_code bad = arena ? bh_run_schedule_make(table, arena, s, &err) : BH_ENOMEM;
    if (!bad)
        bad = render(format, s, &out);
    err.code = bad;
    if (!bad) {
        bh_say_diags(stderr, bh_table_warnings(table));
        if (strcmp(format, "csv") == 0)
            bh_say_cautions(stderr, table);
    }
    const int status =
        bad ? bh_complain(stderr, &err) : bh_output(&out, arguments->value[BH_OPT_OUTPUT]);
    bh_text_free(&out);
    bh_arena_free(arena);
    return status;
}

int bh_cmd_schedule(const bh_arguments *arguments)
{
    const char *format = bh_arguments_format(arguments, BH_OPT_SCHEDULE_FORMAT);
    const char *start = arguments->value[BH_OPT_START];
    bh_run_schedule s = {.has_start = start != NULL, .version = bh_version()};
    bh_error err = {.code = BH_OK};
    bh_input in = {0};
    if (!format)
        return EX_USAGE;
    if (arguments->word_count != 1)
        return bh_usage(arguments, "needs one plan (or - for standard input)");
    if (start && bh_wall_read(start, &s.start, &err))
        return bh_usage_option(arguments, BH_OPT_START, err.text);
    const bh_evaluation wanted = {.without_changes = true};
    int status = bh_input_table(arguments->words[0], arguments, &wanted, &in);
    if (status == 0)
        status = show(arguments, format, in.table, &s);
    bh_input_close(&in);
    return status;
}
