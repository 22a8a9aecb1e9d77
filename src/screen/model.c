/* model.c - where keys go, and what becomes of answers. */
#include "beamhours/screen/model.h"

#include <stdarg.h>
#include <stdio.h>
#include <string.h>

enum { MOST_PASTED = 256 /* characters where each is acted upon */ };

bool bh_model_open(bh_model *model, const char *bytes, size_t length, const char *file)
{
    (void)snprintf(model->file, sizeof model->file, "%.*s", (int)sizeof model->file - 1, file);
    bh_diags_free(model->said);
    model->said = bh_diags_new();
    bh_edit_free(model->edit);
    model->edit = model->said ? bh_edit_open(bytes, length, file, model->said) : NULL;
    bh_text_free(&model->unread);
    if (!model->edit)
        bh_text_append_bytes(&model->unread, bytes, length);
    bh_plan_lines_free(&model->plan);
    bh_table_free_view(&model->table);
    bh_outcome_leave(model->now);
    bh_outcome_leave(model->kept);
    bh_outcome_leave(model->pin);
    bh_reply_free(model->curve);
    model->now = model->kept = model->pin = NULL;
    model->curve = NULL;
    model->trying = model->rescued = false;
    model->job_due = model->curve_due = true;
    bh_plan_lines_make(model);
    return model->said && !model->unread.failed;
}

void bh_model_close(bh_model *model)
{
    bh_edit_free(model->edit);
    bh_edit_free(model->dropped);
    bh_diags_free(model->said);
    bh_text_free(&model->unread);
    bh_text_free(&model->trial);
    bh_plan_lines_free(&model->plan);
    bh_table_free_view(&model->table);
    bh_outcome_leave(model->now);
    bh_outcome_leave(model->kept);
    bh_outcome_leave(model->pin);
    bh_reply_free(model->curve);
    bh_sheet_close(&model->sheet);
    bh_choose_close(&model->chooser);
}

void bh_model_note(bh_model *model, bool bad, const char *fmt, ...)
{
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(model->note, sizeof model->note, fmt, args);
    va_end(args);
    model->note_bad = bad;
    model->spoke = true;
}

const char *bh_model_bytes(const bh_model *model, size_t *length)
{
    if (model->edit)
        return bh_edit_bytes(model->edit, length);
    *length = model->unread.length;
    return model->unread.bytes ? model->unread.bytes : "";
}

const char *bh_model_text(const bh_model *model, size_t *length)
{
    if (!model->trying)
        return bh_model_bytes(model, length);
    *length = model->trial.length;
    return model->trial.bytes;
}

size_t bh_model_unsaved(const bh_model *model)
{
    const size_t steps = model->edit ? bh_edit_unsaved(model->edit) : 0;
    return steps + (model->rescued ? 1 : 0);
}

void bh_model_saved(bh_model *model)
{
    model->rescued = model->fresh = false;
    if (model->edit)
        (void)bh_edit_saved(model->edit);
}

bool bh_model_replace(bh_model *model, const char *bytes, size_t length)
{
    bh_diags *diags = bh_diags_new();
    bh_edit *readable = diags ? bh_edit_open(bytes, length, model->file, diags) : NULL;
    bh_diags_free(diags);
    bh_edit_free(readable);
    if (!readable)
        return false;
    const bool opened = bh_model_open(model, bytes, length, model->file);
    model->rescued = true;
    return opened;
}

bool bh_model_reload(bh_model *model, const char *bytes, size_t length)
{
    if (model->edit && bh_edit_replace(model->edit, bytes, length, "read again from the file")) {
        model->rescued = false;
        model->job_due = true;
        bh_change_done(model);
        bh_model_note(model, false, "read again from the file; b brings yours back");
        return true;
    }
    bh_edit *dropped = model->edit;
    char file[sizeof model->file];
    memcpy(file, model->file, sizeof file);
    model->edit = NULL;
    const bool opened = bh_model_open(model, bytes, length, file);
    bh_edit_free(model->dropped);
    model->dropped = dropped;
    bh_model_note(model, true, "the file cannot be read as a plan; b brings yours back");
    return opened;
}

bool bh_model_current(const bh_model *model)
{
    return !model->job_due && model->now && model->now->job == model->job &&
           (model->now->complete || !model->now->of->plan || model->now->failed[0]);
}

const bh_outcome *bh_model_concluded(const bh_model *model)
{
    if (model->now && model->now->complete)
        return model->now;
    return model->kept && model->kept->complete ? model->kept : NULL;
}

/* What is wrong with what is typed, in the words of the plan's reader. */
static void say_why(bh_model *model)
{
    const bh_diags *said = model->now->of->said;
    model->why[0] = '\0';
    for (size_t i = 0; !model->now->of->plan && i < bh_diags_count(said); i++) {
        const bh_diag *d = bh_diags_at(said, i);
        if (d->severity != BH_SEVERITY_ERROR)
            continue;
        (void)snprintf(model->why, sizeof model->why, "%.*s", (int)sizeof model->why - 1, d->text);
        return;
    }
}

void bh_model_adopt(bh_model *model, bh_outcome *outcome)
{
    if (!outcome)
        return;
    if (outcome->job != model->job) {
        bh_outcome_leave(outcome);
        return;
    }
    bh_outcome_leave(model->now);
    model->now = outcome;
    if (outcome->complete && !model->trying) {
        bh_outcome_leave(model->kept);
        model->kept = bh_outcome_share(outcome);
    }
    if (model->trying)
        say_why(model);
    bh_table_refresh(model);
}

void bh_model_answer(bh_model *model, bh_reply *answer)
{
    if (answer->kind == BH_ASK_CURVE && answer->number == model->curve_asked) {
        bh_reply_free(model->curve);
        model->curve = answer;
        return;
    }
    if (answer->kind == BH_ASK_EXPLAIN && answer->number == model->explain_asked)
        bh_sheet_explain(model, answer);
    if (answer->kind == BH_ASK_SOLVE && answer->number == model->solving.asked)
        bh_solving_answered(model, answer);
    bh_reply_free(answer);
}

void bh_model_resize(bh_model *model, int rows, int columns)
{
    model->rows = rows < 1 ? 1 : rows;
    model->columns = columns < 1 ? 1 : columns;
    if (model->field.width)
        model->field.width = bh_field_width(model);
    bh_plan_keep_in_view(model);
    bh_table_refresh(model);
    if (model->over == BH_OVER_SHEET)
        bh_sheet_resized(model);
}

/* --- keys --- */

static bool is_mouse(const bh_press *press)
{
    return press->kind >= BH_PRESS_CLICK && press->kind <= BH_PRESS_WHEEL_DOWN;
}

static bool begins_value(const bh_press *press)
{
    const uint32_t p = press->point;
    return press->kind == BH_PRESS_POINT &&
           ((p >= '0' && p <= '9') || p == '.' || p == '-' || p == 0xB1);
}

static void switch_pane(bh_model *model)
{
    model->menu_from = 0;
    model->pane = model->pane == BH_PANE_PLAN ? BH_PANE_TABLE : BH_PANE_PLAN;
    bh_table_refresh(model); /* on a narrow terminal it was not laid out */
    bh_plan_keep_in_view(model);
}

/* The part under the mouse gets the focus. */
static void mouse(bh_model *model, const bh_press *press)
{
    const bh_arrangement places = bh_arrange(model);
    if (press->row == places.menu) {
        bh_menu_click(model, press->column);
        return;
    }
    if (press->row == places.caution && press->kind != BH_PRESS_WHEEL_UP &&
        press->kind != BH_PRESS_WHEEL_DOWN) {
        bh_sheet_show(model, BH_SHEET_CAUTIONS);
        return;
    }
    if (places.message >= 0 && press->row >= places.message && press->row < places.caution) {
        bh_sheet_show(model, BH_SHEET_MESSAGES);
        return;
    }
    if (press->row < places.body)
        return;
    const bool plan = places.plan_columns && press->column < places.plan_columns;
    model->pane = plan ? BH_PANE_PLAN : BH_PANE_TABLE;
    if (plan)
        (void)bh_plan_press(model, press);
    else
        (void)bh_table_press(model, press);
}

static void base_press(bh_model *model, const bh_press *press)
{
    if (is_mouse(press)) {
        mouse(model, press);
        return;
    }
    if (press->kind == BH_PRESS_TAB || press->kind == BH_PRESS_BACK_TAB) {
        switch_pane(model);
        return;
    }
    if (press->kind == BH_PRESS_INTERRUPT) {
        bh_leave(model);
        return;
    }
    if (model->pane == BH_PANE_PLAN && begins_value(press) && bh_plan_here(model)) {
        bh_value_begin(model, press);
        return;
    }
    if (model->pane == BH_PANE_TABLE && begins_value(press) && bh_table_here(model)) {
        bh_solving_begin(model, press);
        return;
    }
    if (bh_action_press(model, press))
        return;
    if (model->pane == BH_PANE_PLAN)
        (void)bh_plan_press(model, press);
    else
        (void)bh_table_press(model, press);
}

void bh_leave(bh_model *model)
{
    const size_t unsaved = bh_model_unsaved(model);
    if (!unsaved) {
        model->wish = BH_WISH_LEAVE;
        return;
    }
    (void)snprintf(model->question_text[0], sizeof *model->question_text,
                   "%zu change%s not saved in %.180s.", unsaved, unsaved == 1 ? " is" : "s are",
                   model->file);
    model->question_text[1][0] = model->question_text[2][0] = '\0';
    bh_ask(model, BH_QUESTION_LEAVE);
}

static void name_press(bh_model *model, const bh_press *press)
{
    if (press->kind == BH_PRESS_ESCAPE || press->kind == BH_PRESS_INTERRUPT) {
        model->over = BH_OVER_NOTHING;
    } else if (press->kind == BH_PRESS_ENTER && model->field.length) {
        model->over = BH_OVER_NOTHING;
        model->wish = BH_WISH_SAVE_AS;
    } else {
        (void)bh_field_press(&model->field, press);
    }
}

/* To the part that is in front. */
static void dispatch(bh_model *model, const bh_press *press)
{
    switch (model->over) {
    case BH_OVER_NOTHING:
        base_press(model, press);
        break;
    case BH_OVER_FIELD:
        if (!is_mouse(press))
            (void)bh_value_press(model, press);
        break;
    case BH_OVER_SHEET:
        (void)bh_sheet_press(model, press);
        break;
    case BH_OVER_CHOOSE:
        (void)bh_choose_press(model, press);
        break;
    case BH_OVER_SOLVE:
        (void)bh_solving_press(model, press);
        break;
    case BH_OVER_ASK:
        (void)bh_ask_press(model, press);
        break;
    case BH_OVER_FIND:
        (void)bh_find_press(model, press);
        break;
    case BH_OVER_NAME:
        name_press(model, press);
        break;
    }
}

/* What was pasted is text for a field, and commands nothing: no line of it is an Enter.  It is
 * tried out when all of it has come. */
static void take_pasted(bh_model *model, const bh_press *press)
{
    const bool field = model->over == BH_OVER_FIELD, lines = field && model->field.width > 0;
    bh_press typed = *press;
    typed.pasted = false;
    if (typed.kind == BH_PRESS_POINT && typed.point == '\n') {
        typed.kind = lines ? BH_PRESS_TAB : BH_PRESS_POINT;
        typed.point = ' ';
    }
    if (field && press->kind == BH_PRESS_PASTED)
        bh_value_attempt(model, model->field.bytes);
    else if (field)
        (void)bh_field_press(&model->field, &typed);
    else if (model->over == BH_OVER_NOTHING || model->over == BH_OVER_ASK ||
             model->over == BH_OVER_SHEET)
        bh_model_note(model, true,
                      "what is pasted is text for a value: Enter on a line begins one");
    else if (press->kind != BH_PRESS_PASTED && model->pasted++ < MOST_PASTED)
        dispatch(model, &typed);
    if (press->kind == BH_PRESS_PASTED)
        model->pasted = 0;
}

/* F1 is the help; no other has a meaning, and says so.  Where text is typed ? is a letter. */
static void function_press(bh_model *model, int number)
{
    char name[16];
    const bool base = model->over == BH_OVER_NOTHING;
    if (number == 1 && base) {
        bh_sheet_show(model, BH_SHEET_HELP);
        return;
    }
    (void)snprintf(name, sizeof name, number ? "F%d" : "Insert", number);
    bh_model_note(model, true, "%s is no key here%s", name, base ? "; ? shows all keys" : "");
}

void bh_model_press(bh_model *model, const bh_press *press)
{
    if (press->kind == BH_PRESS_NOTHING)
        return;
    if (press->pasted || press->kind == BH_PRESS_PASTED) {
        take_pasted(model, press);
        return;
    }
    model->note[0] = '\0';
    if (press->kind == BH_PRESS_SUSPEND) {
        model->wish = BH_WISH_SUSPEND;
        return;
    }
    if (press->kind == BH_PRESS_FUNCTION && model->over != BH_OVER_SHEET) /* that any key closes */
        function_press(model, (int)press->point);
    else
        dispatch(model, press);
}
