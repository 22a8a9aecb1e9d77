/* cmd_solve.c - beamhours solve PLAN SETTING KEY=VALUE --by INPUT: what it would take. */
#include <stdlib.h>
#include <string.h>

#include "beamhours/command/complain.h"
#include "beamhours/command/input.h"
#include "beamhours/run/solve.h"

/* Reads KEY=VALUE; returns 0 or 64. */
static int read_wanted(const bh_arguments *arguments, bh_question *q)
{
    const char *word = arguments->words[2], *equals = strchr(word, '='), *near = NULL;
    bh_text say = {0};
    bh_error err = {.text = ""};
    int status = 0;
    char *key = equals ? strndup(word, (size_t)(equals - word)) : NULL;
    if (!equals)
        return bh_usage(arguments, "the third word is KEY=VALUE, such as hours=8 or q2='0.6 GeV2'");
    q->column = key ? bh_solve_column(key, &near) : BH_COLUMN_COUNT;
    if (q->column == BH_COLUMN_COUNT) {
        bh_text_appendf(&say, "no column of numbers is called \"%s\"", key ? key : "");
        if (near && strcmp(near, key) != 0)
            bh_text_appendf(&say, "; did you mean \"%s\"?", near);
        else
            bh_text_append(&say, "; the table has hours, statistical_uncertainty, q2_GeV2, "
                                 "signal_rate_Hz and others");
        status = bh_usage(arguments, say.failed ? "no such column" : say.bytes);
    } else if (bh_solve_wanted(q->column, equals + 1, &q->wanted, &err)) {
        status = bh_usage(arguments, err.text);
    }
    bh_text_free(&say);
    free(key);
    return status;
}

static int ask(const bh_arguments *arguments, const bh_input *in, const bh_question *asked)
{
    bh_question q = *asked;
    bh_change changes[BH_MOST_CHANGES];
    char *keys[BH_MOST_CHANGES] = {NULL};
    bh_answer answer;
    bh_error err = {.text = ""};
    bh_text out = {0};
    int status = bh_input_changes(arguments, changes, keys);
    q.changes = changes;
    q.change_count = (size_t)arguments->with_count;
    q.bytes = in->bytes.bytes ? in->bytes.bytes : "";
    q.length = in->bytes.length;
    q.name = in->shown ? in->shown : in->name;
    q.library = in->library;
    const bh_code code = status ? BH_OK : bh_solve(&q, &answer, &err);
    if (code == BH_EDOMAIN)
        status = bh_usage(arguments, err.text);
    else if (code)
        status = bh_complain(stderr, &err);
    if (!status) {
        bh_answer_say(&q, &answer, &out);
        bh_text_append(&out, "\n");
        status = bh_output(&out, NULL);
    }
    for (int i = 0; i < arguments->with_count; i++)
        free(keys[i]);
    return status;
}

int bh_cmd_solve(const bh_arguments *arguments)
{
    bh_question q = {.by = arguments->value[BH_OPT_BY],
                     .arm = arguments->value[BH_OPT_ARM],
                     .from = arguments->value[BH_OPT_FROM],
                     .to = arguments->value[BH_OPT_TO]};
    if (arguments->word_count != 3)
        return bh_usage(arguments, "needs a plan, the name of a setting and KEY=VALUE");
    if (!q.by)
        return bh_usage(arguments,
                        "needs --by angle, current, energy, thickness or solid-angle, or "
                        "the path of another input");
    int status = read_wanted(arguments, &q);
    if (status)
        return status;
    bh_input in;
    q.setting = arguments->words[1];
    status = bh_input_open(arguments->words[0], &in);
    if (status == 0)
        status = bh_input_plan(&in, arguments); /* with all its errors, should it have some */
    if (status == 0)
        status = ask(arguments, &in, &q);
    bh_input_close(&in);
    return status;
}
