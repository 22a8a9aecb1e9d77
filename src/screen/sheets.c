/* sheets.c - texts to read: help, messages, cautions, what a key means, an explanation. */
#include <stdio.h>
#include <string.h>

#include "beamhours/document/trail.h"
#include "beamhours/plan/key_list.h"
#include "beamhours/screen/sheet.h"

void bh_sheet_close(bh_sheet *sheet)
{
    bh_arena_free(sheet->arena);
    *sheet = (bh_sheet){0};
}

static void write_help(bh_model *model, bh_sheet_writer *w)
{
    static const struct {
        const char *key, *what;
    } moves[] = {{"arrows", "move; in the plan left and right close and open, in the table they "
                            "change the column"},
                 {"Page Up, Page Down, Home, End", "move further"},
                 {"Tab", "to the other part"},
                 {"a digit", "begins a value of the line in focus"},
                 {"Enter, Escape", "keep what was typed; leave everything as it was"},
                 {"Up, Down in a value", "one more or less of the digit before the cursor"},
                 {"Tab in a text", "a new line, where a text may have several: notes"},
                 {"mouse", "a click goes there, a second one opens; a click on a heading orders"},
                 {"F1", "all keys, as ? does"},
                 {"Ctrl-C, Ctrl-Z", "leave; suspend"}};
    bh_sheet_add(w, BH_LOOK_TITLE, "", "In every part");
    for (size_t i = 0; i < sizeof moves / sizeof moves[0]; i++)
        bh_sheet_pair(w, moves[i].key, moves[i].what);
    static const char *const parts[] = {"", "In the plan", "In the run table",
                                        "In the plan and in the run table"};
    for (unsigned where = 1; where <= 3; where++) { /* what always is in sight is in both */
        bh_sheet_add(w, BH_LOOK_TITLE, "", "");
        bh_sheet_add(w, BH_LOOK_TITLE, "", parts[where]);
        const bh_action *a;
        for (size_t i = 0; (a = bh_action_at(i)); i++)
            if ((a->where & 3) == where) {
                char key[64];
                (void)snprintf(key, sizeof key, "%s  %s", a->key, a->word);
                bh_sheet_pair(w, key, a->help);
            }
    }
    (void)model;
}

/* All that is said of the plan, with the lines it is said of. */
static const bh_diags *all_said(const bh_model *model)
{
    if (!model->edit)
        return model->said;
    return model->now ? bh_outcome_diags(model->now) : NULL;
}

static void write_messages(bh_model *model, bh_sheet_writer *w)
{
    const bh_diags *said = all_said(model);
    if (!said || bh_diags_count(said) == 0)
        bh_sheet_add(w, BH_LOOK_PLAIN, "", "Nothing to say: no errors, no warnings.");
    for (size_t i = 0; said && i < bh_diags_count(said); i++) {
        const bh_diag *d = bh_diags_at(said, i);
        const bool error = d->severity == BH_SEVERITY_ERROR;
        char lead[40];
        (void)snprintf(lead, sizeof lead, "%s line %d", error ? "ERROR  " : "WARNING", d->at.line);
        bh_sheet_add(w, error ? BH_LOOK_ERROR : BH_LOOK_WARNING, "", lead);
        bh_sheet_add(w, BH_LOOK_QUIET, "  ", d->key);
        bh_sheet_add(w, BH_LOOK_PLAIN, "  ", d->text);
    }
}

static void write_cautions(bh_model *model, bh_sheet_writer *w)
{
    const bh_outcome *o = bh_model_concluded(model);
    for (size_t i = 0; o && i < o->end.caution_count; i++) {
        const bh_caution *c = &o->end.cautions[i];
        char at[40] = "CAUTION";
        if (c->at.line > 0)
            (void)snprintf(at, sizeof at, "CAUTION  line %d", c->at.line);
        bh_sheet_add(w, BH_LOOK_CAUTION, "", at);
        bh_sheet_add(w, BH_LOOK_PLAIN, "  ", c->text);
    }
    if (!o)
        bh_sheet_add(w, BH_LOOK_PLAIN, "",
                     "Cautions follow from the plan once it can be computed. Whatever it says: the "
                     "facility's radiation-protection group, its rules and licensed practice "
                     "decide.");
}

static void write_key(bh_sheet_writer *w, const bh_plan_key *key)
{
    const struct {
        const char *name, *text;
    } rows[] = {{"means", key->meaning},
                {"takes", key->kind},
                {"units", key->units[0] ? key->units : NULL},
                {"required", key->required ? "yes" : "no"},
                {"", key->group[0] ? key->group : NULL},
                {"default", key->preset},
                {"example", key->example},
                {"", key->built ? NULL : "read and checked, but no number depends on it yet"}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++)
        if (rows[i].text)
            bh_sheet_pair(w, rows[i].name, rows[i].text);
}

static void write_about(bh_model *model, bh_sheet_writer *w)
{
    const bh_plan_line *line = bh_plan_here(model);
    bh_text path = {0};
    bh_plan_key key;
    if (line)
        bh_trail_of(line->node, &path);
    bh_sheet_add(w, BH_LOOK_TITLE, "", path.bytes ? path.bytes : "the plan");
    if (path.bytes && bh_plan_key_find(path.bytes, &key, NULL))
        write_key(w, &key);
    else
        bh_sheet_add(w, BH_LOOK_PLAIN, "", "An item of a list: its keys stand below it.");
    bh_text_free(&path);
}

static void write_history(bh_model *model, bh_sheet_writer *w)
{
    const size_t steps = model->edit ? bh_edit_steps(model->edit) : 0;
    if (steps == 0)
        bh_sheet_add(w, BH_LOOK_PLAIN, "", "Nothing was changed yet.");
    for (size_t i = 0; i < steps; i++) {
        const bool done = i < bh_edit_done(model->edit);
        bh_sheet_add(w, done ? BH_LOOK_PLAIN : BH_LOOK_QUIET, done ? "  " : "  (taken back) ",
                     bh_edit_step_at(model->edit, i)->text);
    }
}

static void ask_to_explain(bh_model *model, bh_sheet_writer *w)
{
    bh_sheet_add(w, BH_LOOK_QUIET, "", "being computed \u2026");
    model->explain_due = true;
}

static void scroll(bh_model *model, long by)
{
    bh_sheet *s = &model->sheet;
    const int room = bh_arrange(model).body_rows - 1;
    const long most = (long)s->count - room;
    long top = (long)s->top + by;
    top = top > most ? most : top;
    s->top = (size_t)(top < 0 ? 0 : top);
}

void bh_sheet_show(bh_model *model, bh_sheet_kind kind)
{
    static const struct {
        const char *title;
        void (*write)(bh_model *, bh_sheet_writer *);
    } sheets[] = {
        [BH_SHEET_HELP] = {"ALL KEYS", write_help},
        [BH_SHEET_MESSAGES] = {"MESSAGES   Enter goes to the line", write_messages},
        [BH_SHEET_CAUTIONS] = {"CAUTIONS", write_cautions},
        [BH_SHEET_EXPLAIN] = {"EXPLAINED", ask_to_explain},
        [BH_SHEET_ABOUT] = {"WHAT THE KEY MEANS", write_about},
        [BH_SHEET_HISTORY] = {"CHANGES SO FAR", write_history},
    };
    bh_sheet_writer w;
    if (!bh_sheet_begin(model, kind, sheets[kind].title, &w))
        return;
    sheets[kind].write(model, &w);
}

void bh_sheet_resized(bh_model *model)
{
    const size_t top = model->sheet.top;
    if (model->sheet.kind == BH_SHEET_EXPLAIN) {
        model->explain_due = true; /* what it says now stays until the answer */
        return;
    }
    bh_sheet_show(model, model->sheet.kind);
    scroll(model, (long)top);
}

void bh_sheet_explain(bh_model *model, const bh_reply *answer)
{
    bh_sheet_writer w;
    const size_t top = model->sheet.top;
    if (model->over != BH_OVER_SHEET || model->sheet.kind != BH_SHEET_EXPLAIN ||
        !bh_sheet_begin(model, BH_SHEET_EXPLAIN, "EXPLAINED", &w))
        return;
    if (!answer->explanation) {
        bh_sheet_add(&w, BH_LOOK_ERROR, "", answer->why.text);
        return;
    }
    for (size_t i = 0; i < bh_explanation_lines(answer->explanation); i++)
        bh_sheet_explained(&w, bh_explanation_line(answer->explanation, i));
    scroll(model, (long)top);
}

/* --- keys --- */

/* The message that the first line in view belongs to. */
static void go_to_line(bh_model *model)
{
    int line = 0;
    for (size_t i = 0; i <= model->sheet.top && i < model->sheet.count; i++) {
        const char *at = strstr(model->sheet.lines[i].text, " line ");
        if (model->sheet.lines[i].look >= BH_LOOK_WARNING && at)
            (void)sscanf(at, " line %d", &line); /* NOLINT(cert-err34-c): our own digits */
    }
    bh_plan_go_line(model, line);
}

bool bh_sheet_press(bh_model *model, const bh_press *press)
{
    const long page = bh_arrange(model).body_rows - 2;
    switch (press->kind) {
    case BH_PRESS_UP:
        scroll(model, -1);
        return true;
    case BH_PRESS_DOWN:
        scroll(model, 1);
        return true;
    case BH_PRESS_WHEEL_UP:
        scroll(model, -3);
        return true;
    case BH_PRESS_WHEEL_DOWN:
        scroll(model, 3);
        return true;
    case BH_PRESS_PAGE_UP:
        scroll(model, -page);
        return true;
    case BH_PRESS_PAGE_DOWN:
        scroll(model, page);
        return true;
    case BH_PRESS_HOME:
        model->sheet.top = 0;
        return true;
    case BH_PRESS_END:
        scroll(model, (long)model->sheet.count);
        return true;
    default:
        if (press->kind == BH_PRESS_ENTER && model->sheet.kind == BH_SHEET_MESSAGES)
            go_to_line(model);
        model->over = BH_OVER_NOTHING;
        bh_sheet_close(&model->sheet);
        return true;
    }
}
