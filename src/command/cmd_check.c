/* cmd_check.c - beamhours check PLAN...: errors and warnings, and nothing else. */
#include "beamhours/command/input.h"

static int check(const char *name, const bh_arguments *arguments)
{
    bh_input in;
    const int status =
        bh_input_table(name, arguments, &(bh_evaluation){.without_changes = true}, &in);
    if (status == 0) {
        const bh_diags *said = bh_table_warnings(in.table);
        bh_say_diags(stderr, said);
        if (bh_diags_count(said) == 0)
            printf("%s: no errors, no warnings\n", name);
        else
            printf("%s: no errors, %zu warning%s\n", name, bh_diags_count(said),
                   bh_diags_count(said) == 1 ? "" : "s");
    }
    bh_input_close(&in);
    return status;
}

int bh_cmd_check(const bh_arguments *arguments)
{
    if (arguments->word_count < 1)
        return bh_usage(arguments, "needs a plan (or - for standard input)");
    int worst = 0;
    for (int i = 0; i < arguments->word_count; i++) {
        const int status = check(arguments->words[i], arguments);
        if (status > worst)
            worst = status;
    }
    return worst;
}
