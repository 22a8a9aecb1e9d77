/* solving.c - what would it take: asked anew whenever output, value or input change. */
#include <math.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/number.h"
#include "beamhours/screen/model.h"

enum { OUTPUT, WANTED, INPUT, SOLUTIONS };

/* What can be wanted; the column in focus too, where it is another one. */
static const bh_column_id outputs[] = {BH_COL_HOURS, BH_COL_STATISTICAL, BH_COL_Q2, BH_COL_SIGNAL,
                                       BH_COL_COUNTS};
enum { OUTPUTS = (int)(sizeof outputs / sizeof outputs[0]) };

static int number_of(bh_column_id output)
{
    int i = 0;
    while (i < OUTPUTS && outputs[i] != output)
        i++;
    return i;
}

static void forget(bh_solving *s)
{
    s->answer.count = 0;
    s->said[0] = '\0';
    s->bad = false;
    s->waiting = s->due = s->enter = false;
    s->asked = 0;
}

/* A number alone is in the unit that the table shows the column in, and the form says. */
static bool is_bare(const char *text)
{
    const char *end = NULL;
    double number = 0;
    return bh_number_parse(text, &end, &number) == BH_OK && end[strspn(end, " ")] == '\0';
}

/* What is typed is wanted: asks, or says why it cannot. */
static void ask(bh_model *model)
{
    bh_solving *s = &model->solving;
    bh_error err = {.code = BH_OK};
    forget(s);
    if (model->trying)
        bh_value_leave(model);
    model->over = BH_OVER_SOLVE;
    if (!s->wanted.length)
        return;
    if (bh_solve_wanted(s->output, s->wanted.bytes, &s->value, &err)) {
        (void)snprintf(s->said, sizeof s->said, "%.500s", err.text);
        s->bad = true;
        return;
    }
    if (bh_solve_in_percent(s->output) && is_bare(s->wanted.bytes))
        s->value /= 100;
    s->due = true;
}

void bh_solving_begin(bh_model *model, const bh_press *typed)
{
    const bh_table_row *row = bh_table_here(model);
    bh_solving *s = &model->solving;
    if (!row || !model->edit)
        return;
    const bh_setting *setting = bh_table_setting(model, row);
    const int column = model->table.columns[model->table.column].column;
    *s = (bh_solving){.line = WANTED, .output = BH_COL_HOURS, .by = BH_BY_ANGLE};
    (void)snprintf(s->setting, sizeof s->setting, "%.159s", setting->name);
    if (setting->arm_count > 1)
        (void)snprintf(s->arm, sizeof s->arm, "%.319s", setting->arms[row->now->arm].arm.name.text);
    if (bh_column_at(column)->kind == BH_CELL_NUMBER)
        s->output = (bh_column_id)column;
    (void)bh_field_set(&s->wanted, "");
    if (typed)
        (void)bh_field_press(&s->wanted, typed);
    ask(model);
}

/* The solution in focus is tried out, so that the whole table shows what it does. */
static void attempt(bh_model *model)
{
    const bh_solving *s = &model->solving;
    const size_t i = s->line >= SOLUTIONS ? (size_t)(s->line - SOLUTIONS) : 0;
    if (i >= s->answer.count)
        return;
    (void)snprintf(model->field_path, sizeof model->field_path, "%s", s->answer.path);
    (void)snprintf(model->was, sizeof model->was, "%.150s", s->answer.present);
    model->field_node = NULL;
    bh_value_attempt(model, s->answer.solutions[i].text);
}

static void turn(bh_model *model, int by)
{
    bh_solving *s = &model->solving;
    if (s->line == OUTPUT) {
        const int i = (number_of(s->output) + OUTPUTS + by) % OUTPUTS;
        s->output = outputs[i];
    } else if (s->line == INPUT) {
        s->by = (s->by + BH_BY_COUNT + by) % BH_BY_COUNT;
    } else {
        return;
    }
    ask(model);
}

static void go_by(bh_model *model, int by)
{
    bh_solving *s = &model->solving;
    const int last = SOLUTIONS + (int)s->answer.count - 1;
    const int at = s->line + by;
    s->line = at < 0 ? 0 : at > last ? last : at;
    if (s->line >= SOLUTIONS)
        attempt(model);
}

static void leave(bh_model *model)
{
    forget(&model->solving);
    bh_value_leave(model);
}

/* Takes the solution that is tried out. */
static void take(bh_model *model)
{
    bh_solving *s = &model->solving;
    const size_t i = s->line >= SOLUTIONS ? (size_t)(s->line - SOLUTIONS) : 0;
    if (i >= s->answer.count) {
        s->enter = s->waiting || s->due;
        if (!s->enter && !s->said[0])
            (void)snprintf(s->said, sizeof s->said, "type the value that is wanted");
        return;
    }
    char said[200];
    (void)snprintf(said, sizeof said, "%.120s: %.60s", s->answer.path, s->answer.solutions[i].text);
    (void)snprintf(model->field_path, sizeof model->field_path, "%s", s->answer.path);
    model->field_node = NULL;
    if (!bh_value_keep(model, s->answer.solutions[i].text)) {
        (void)snprintf(s->said, sizeof s->said, "%.500s", model->why);
        s->bad = true;
        model->over = BH_OVER_SOLVE;
        return;
    }
    forget(s);
    bh_model_note(model, false, "taken: %s", said);
}

void bh_solving_answered(bh_model *model, const bh_reply *reply)
{
    bh_solving *s = &model->solving;
    if (model->over != BH_OVER_SOLVE)
        return;
    s->waiting = false;
    s->bad = !reply->solved;
    (void)snprintf(s->said, sizeof s->said, "%.500s",
                   reply->solved && reply->sentence.bytes ? reply->sentence.bytes
                                                          : reply->why.text);
    if (!reply->solved)
        return;
    s->answer = *reply->solved;
    if (s->answer.count > BH_SOLVE_MOST)
        s->answer.count = BH_SOLVE_MOST;
    attempt(model);
    if (s->enter)
        take(model);
}

bool bh_solving_press(bh_model *model, const bh_press *press)
{
    bh_solving *s = &model->solving;
    switch (press->kind) {
    case BH_PRESS_UP:
        go_by(model, -1);
        return true;
    case BH_PRESS_DOWN:
    case BH_PRESS_TAB:
        go_by(model, 1);
        return true;
    case BH_PRESS_LEFT:
    case BH_PRESS_RIGHT:
        if (s->line == WANTED)
            return bh_field_press(&s->wanted, press);
        turn(model, press->kind == BH_PRESS_LEFT ? -1 : 1);
        return true;
    case BH_PRESS_ENTER:
        take(model);
        return true;
    case BH_PRESS_ESCAPE:
    case BH_PRESS_INTERRUPT:
        leave(model);
        return true;
    default:
        if (press->kind == BH_PRESS_POINT)
            s->line = WANTED;
        if (s->line == WANTED && bh_field_press(&s->wanted, press))
            ask(model);
        return true;
    }
}
