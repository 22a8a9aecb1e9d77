/* cmd_explain.c - beamhours explain PLAN SETTING: one row, number by number. */
#include "beamhours/base/number.h"
#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/report/explain_text.h"
#include "beamhours/run/explain.h"

static int bin_of(const bh_arguments *arguments, int *bin)
{
    const char *given = arguments->value[BH_OPT_BIN], *end = NULL;
    double number = 0.0;
    *bin = 0;
    if (!given)
        return 0;
    if (bh_number_parse(given, &end, &number) || *end || !(number >= 1.0 && number <= 1000.0) ||
        number > (double)(int)number)
        return bh_usage(arguments, "--bin needs a whole number from 1");
    *bin = (int)number;
    return 0;
}

int bh_cmd_explain(const bh_arguments *arguments)
{
    int bin = 0;
    if (arguments->word_count != 2)
        return bh_usage(arguments, "needs a plan and the name of a setting");
    int status = bin_of(arguments, &bin);
    if (status)
        return status;
    bh_input in;
    status = bh_input_table(arguments->words[0], arguments, &(bh_evaluation){.bins = bin > 0}, &in);
    if (status == 0) {
        bh_error err = {.code = BH_OK};
        bh_text out = {0};
        bh_explanation *why =
            bh_explain(in.table, arguments->words[1], arguments->value[BH_OPT_ARM], bin, &err);
        if (why) {
            bh_say_diags(stderr, bh_table_warnings(in.table));
            bh_report_explanation(why, bh_places_width(), &out);
            status = bh_output(&out, NULL);
        } else {
            status = bh_usage(arguments, err.text);
        }
        bh_explanation_free(why);
    }
    bh_input_close(&in);
    return status;
}
