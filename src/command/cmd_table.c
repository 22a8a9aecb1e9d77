/* cmd_table.c - beamhours table PLAN: the run table. */
#include <string.h>
#include <sysexits.h>

#include "beamhours.h"
#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/report/csv.h"
#include "beamhours/report/json.h"
#include "beamhours/report/latex.h"
#include "beamhours/report/marked_table.h"
#include "beamhours/report/text_table.h"

static bh_selection_request request_of(const bh_arguments *arguments)
{
    return (bh_selection_request){
        .bins = arguments->value[BH_OPT_BINS] != NULL,
        .columns = arguments->value[BH_OPT_COLUMNS],
        .sort = arguments->value[BH_OPT_SORT],
        .only = arguments->value[BH_OPT_ONLY],
    };
}

/* `before` is NULL unless rows are to be shown before and after a change. */
static bh_code render(const char *format, const bh_selection *before, const bh_selection *view,
                      bh_text *out)
{
    if (strcmp(format, "csv") == 0) {
        if (before)
            bh_report_csv_against(before, view, out);
        else
            bh_report_csv(view, out);
        return BH_OK;
    }
    if (strcmp(format, "json") == 0)
        return before ? bh_report_json_against(before, view, bh_version(), out)
                      : bh_report_json(view, bh_version(), out);
    if (strcmp(format, "markdown") == 0)
        bh_report_markdown(before, view, out);
    else if (strcmp(format, "latex") == 0)
        bh_report_latex(before, view, out);
    else if (before)
        bh_report_text_against(before, view, bh_places_width(), out);
    else
        bh_report_text(view, bh_places_width(), out);
    return BH_OK;
}

/* A comma-separated file has no room for cautions: they go where the warnings go. */
static void say_aside(const bh_table *table, const char *format)
{
    bh_say_diags(stderr, bh_table_warnings(table));
    if (strcmp(format, "csv") == 0)
        bh_say_cautions(stderr, table);
}

static void say_width(const bh_selection *before, const bh_selection *view)
{
    const double wide = bh_report_latex_wide(before, view);
    if (wide > BH_LATEX_PAGE)
        bh_print(stderr,
                 "beamhours: table: warning: in the smallest letters these columns are about %.0f "
                 "pt wide and the page %.0f pt: choose fewer with --columns KEY,...\n",
                 wide, BH_LATEX_PAGE);
}

static int show(const bh_arguments *arguments, const char *format, const bh_input *before,
                const bh_input *after)
{
    const bh_selection_request request = request_of(arguments);
    bh_selection old = {0}, view = {0};
    bh_text out = {0};
    bh_error err = {.code = BH_OK};
    bh_code bad = bh_selection_new(after->table, &request, &view, &err);
    if (!bad && before)
        bad = bh_selection_new(before->table, &request, &old, &err);
    if (!bad) {
        bad = render(format, before ? &old : NULL, &view, &out);
        err.code = bad;
    }
    int status = 0;
    if (bad == BH_EDOMAIN)
        status = bh_usage(arguments, err.text);
    else if (bad)
        status = bh_complain(stderr, &err);
    if (status == 0) {
        say_aside(after->table, format);
        if (strcmp(format, "latex") == 0)
            say_width(before ? &old : NULL, &view);
        status = bh_output(&out, arguments->value[BH_OPT_OUTPUT]);
    }
    bh_text_free(&out);
    bh_selection_free(&old);
    bh_selection_free(&view);
    return status;
}

/* Whether the changes of rates with angle and momentum are in what is shown. */
static bool shows_changes(const bh_arguments *arguments, const char *format)
{
    static const char changes[] = "rate_change_";
    enum { NARROW = 80 }; /* where they have no room in the text */
    const char *columns = arguments->value[BH_OPT_COLUMNS], *sort = arguments->value[BH_OPT_SORT];
    if (sort && strstr(sort, changes))
        return true;
    return columns ? strstr(columns, changes) != NULL
                   : strcmp(format, "text") != 0 || bh_places_width() > NARROW;
}

int bh_cmd_table(const bh_arguments *arguments)
{
    const char *format = bh_arguments_format(arguments, BH_OPT_TABLE_FORMAT);
    const bool against = arguments->value[BH_OPT_BEFORE_AFTER] != NULL;
    if (!format)
        return EX_USAGE;
    if (arguments->word_count != 1)
        return bh_usage(arguments, "needs one plan (or - for standard input)");
    if (against && arguments->with_count == 0)
        return bh_usage(arguments, "--against needs a change: --with KEY=VALUE");
    const bh_evaluation wanted = {.bins = arguments->value[BH_OPT_BINS] != NULL,
                                  .without_changes = !shows_changes(arguments, format)};
    bh_input after = {0}, before = {0};
    int status = bh_input_table(arguments->words[0], arguments, &wanted, &after);
    if (status == 0 && against) {
        before.name = after.name;
        before.library = after.library;
        before.bytes = after.bytes; /* standard input can be read once only */
        status = bh_input_plan(&before, NULL);
        if (status == 0)
            status = bh_input_evaluate(&before, &wanted);
    }
    if (status == 0)
        status = show(arguments, format, against ? &before : NULL, &after);
    before.library = NULL;
    before.bytes = (bh_text){0};
    bh_input_close(&before);
    bh_input_close(&after);
    return status;
}
