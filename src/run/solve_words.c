/* solve_words.c - from words to a question, and from an answer to words. */
#include <math.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/number.h"
#include "beamhours/run/solve.h"
#include "beamhours/units/quantity.h"

static const struct {
    const char *name, *meaning;
} inputs[BH_BY_COUNT] = {
#define BH_SOLVE_INPUT_ROW(id, name, meaning) {name, meaning},
    BH_SOLVE_INPUTS(BH_SOLVE_INPUT_ROW)
#undef BH_SOLVE_INPUT_ROW
};

const char *bh_solve_input_name(bh_solve_input input)
{
    return inputs[input].name;
}

const char *bh_solve_input_meaning(bh_solve_input input)
{
    return inputs[input].meaning;
}

/* --- the question --- */

/* Is `key` the column's key without its unit? */
static bool short_for(const char *key, const char *column)
{
    const size_t length = strlen(key);
    return length > 0 && strncmp(column, key, length) == 0 && column[length] == '_' &&
           (strchr("GMHmud", column[length + 1]) || strncmp(column + length, "_per_", 5) == 0);
}

bh_column_id bh_solve_column(const char *key, const char **near)
{
    static const char *const others[][2] = {
        {"rate", "signal_rate_Hz"}, {"uncertainty", "statistical_uncertainty"}, {"time", "hours"}};
    for (size_t i = 0; i < sizeof others / sizeof others[0]; i++)
        if (strcmp(key, others[i][0]) == 0)
            key = others[i][1];
    for (int id = 0; id < BH_COLUMN_COUNT; id++) {
        const bh_column *c = bh_column_at(id);
        if (c->kind == BH_CELL_NUMBER && (strcmp(key, c->key) == 0 || short_for(key, c->key)))
            return (bh_column_id)id;
    }
    if (near)
        *near = bh_column_suggest(key);
    return BH_COLUMN_COUNT;
}

bh_code bh_solve_wanted(bh_column_id column, const char *text, double *wanted, bh_error *err)
{
    const bh_column *c = bh_column_at((int)column);
    const char *end = NULL;
    double number = 0;
    if (bh_number_parse(text, &end, &number) == BH_OK && end[strspn(end, " ")] == '\0') {
        *wanted = number;
        return BH_OK;
    }
    const bool share = strcmp(c->unit, "1") == 0;
    for (int d = 0; d < BH_DIM_COUNT; d++) {
        const double size = share && d == BH_DIM_SHARE ? 1 : bh_unit_size(c->unit, (bh_dimension)d);
        bh_quantity q;
        if (size > 0)
            return bh_quantity_parse(text, (bh_dimension)d, &q, err)
                       ? BH_EDOMAIN
                       : (*wanted = q.value / size, BH_OK);
    }
    return bh_fail(err, BH_EDOMAIN, "'%s' is no number; write one in %s", text, c->unit);
}

bool bh_solve_in_percent(bh_column_id column)
{
    return column == BH_COL_STATISTICAL || column == BH_COL_SYSTEMATIC ||
           column == BH_COL_PER_MRAD || column == BH_COL_PER_PERMILLE;
}

/* --- the answer --- */

static void append_output(const bh_question *q, double output, bh_text *out)
{
    char number[BH_NUMBER_SIZE];
    const char *unit = bh_column_at((int)q->column)->unit;
    const bool percent = bh_solve_in_percent(q->column), bare = strcmp(unit, "1") == 0;
    bh_number_digits(percent ? 100 * output : output, 4, number, sizeof number);
    bh_text_appendf(out, "%s%s", number, percent ? " %" : bare ? "" : " ");
    bh_text_append(out, percent || bare ? "" : unit);
}

static void append_question(const bh_question *q, bh_text *out)
{
    bh_text_appendf(out, "%s = ", bh_column_at((int)q->column)->key);
    append_output(q, q->wanted, out);
    bh_text_appendf(out, " in setting %s", q->setting);
    if (q->arm)
        bh_text_appendf(out, ", arm %s", q->arm);
}

static void say_none(const bh_question *q, const bh_answer *a, bh_text *out)
{
    if (!isfinite(a->least)) {
        if (a->refused[0])
            bh_text_appendf(out, ": the plan takes none of the values tried (%s)", a->refused);
        else
            bh_text_append(out, ": the cell is empty with every value tried");
        return;
    }
    bh_text_appendf(out, " from %s to %s: ", a->from, a->to);
    if (a->most - a->least <= 1e-9 * fabs(a->most)) {
        bh_text_append(out, "it stays at ");
        append_output(q, a->most, out);
        return;
    }
    bh_text_append(out, "it lies between ");
    append_output(q, a->least, out);
    bh_text_appendf(out, " (at %s) and ", a->at_least);
    append_output(q, a->most, out);
    bh_text_appendf(out, " (at %s)", a->at_most);
}

void bh_answer_say(const bh_question *question, const bh_answer *answer, bh_text *out)
{
    if (answer->count == 0) {
        bh_text_appendf(out, "no value of %s gives ", answer->path);
        append_question(question, out);
        say_none(question, answer, out);
        return;
    }
    bh_text_appendf(out, "%s: ", answer->path);
    for (size_t i = 0; i < answer->count; i++)
        bh_text_appendf(out, "%s%s",
                        i == 0                  ? ""
                        : i + 1 < answer->count ? ", "
                                                : " or ",
                        answer->solutions[i].text);
    bh_text_appendf(out, " %s ", answer->count == 1 ? "gives" : "give");
    append_question(question, out);
    if (isfinite(answer->output)) {
        bh_text_append(out, "; now it is ");
        append_output(question, answer->output, out);
        if (answer->present[0])
            bh_text_appendf(out, " with %s", answer->present);
    }
}
