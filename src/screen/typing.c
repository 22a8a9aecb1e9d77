/* typing.c - a value while it is typed: provisional until Enter, gone with Escape. */
#include <stdio.h>
#include <string.h>

#include "beamhours/document/trail.h"
#include "beamhours/plan/key_list.h"
#include "beamhours/screen/model.h"

static void copy(char *to, size_t size, const char *from)
{
    (void)snprintf(to, size, "%.*s", (int)size - 1, from ? from : "");
}

static void first_error(const bh_diags *diags, char *why, size_t size)
{
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        if (d->severity == BH_SEVERITY_ERROR) {
            copy(why, size, d->text);
            return;
        }
    }
    copy(why, size, "");
}

static bool same_text(const bh_text *a, const char *bytes, size_t length)
{
    return a->bytes && bytes && a->length == length && memcmp(a->bytes, bytes, length) == 0;
}

static bool is_of(const bh_outcome *o, const char *bytes, size_t length)
{
    return o && o->of->length == length && memcmp(o->of->bytes, bytes, length) == 0;
}

/* How many errors the text has as a plan; the first goes to `why`.  What the worker read is not
 * read again. */
static size_t errors_of(const bh_model *model, const char *bytes, size_t length, char *why,
                        size_t size)
{
    const bh_outcome *o = is_of(model->now, bytes, length) ? model->now : model->kept;
    if (is_of(o, bytes, length)) {
        first_error(o->of->said, why, size);
        return bh_diags_errors(o->of->said);
    }
    bh_diags *diags = bh_diags_new();
    if (!diags)
        return 0;
    bh_plan_free(bh_plan_read(bytes, length, model->file, NULL, 0, model->library, diags));
    const size_t errors = bh_diags_errors(diags);
    first_error(diags, why, size);
    bh_diags_free(diags);
    return errors;
}

/* Is it the whole table of the text as it is kept? */
static bool is_of_text(const bh_model *model, const bh_outcome *o)
{
    size_t length = 0;
    const char *bytes = bh_edit_bytes(model->edit, &length);
    return o && o->complete && is_of(o, bytes, length);
}

static void stop_trying(bh_model *model)
{
    model->trying = false;
    bh_text_free(&model->trial);
    if (model->kept) {
        bh_outcome *kept = bh_outcome_share(model->kept);
        bh_outcome_leave(model->now);
        model->now = kept;
    }
    if (is_of_text(model, model->kept)) { /* nothing is to be computed */
        model->job = model->kept->job;
        model->job_due = false;
        model->abandon = true;
    } else {
        model->job_due = true;
    }
    bh_table_refresh(model);
}

/* The change that is typed, with what it takes the place of. */
enum { MOST_PLACES = 8 };
struct typed {
    bh_edit_change changes[MOST_PLACES];
    char paths[MOST_PLACES][640];
    size_t count;
};

/* A key that is new here goes in the place of another one of which there may only be one: an angle
 * for a q2. */
static void replace_others(const bh_model *model, struct typed *t)
{
    bh_plan_key key;
    const char *dot = strrchr(model->field_path, '.');
    const int parent = dot ? (int)(dot - model->field_path) : 0;
    const bh_document *document = bh_edit_document(model->edit);
    if (bh_document_find(document, model->field_path) ||
        !bh_plan_key_find(model->field_path, &key, NULL))
        return;
    const char *word = strstr(key.group, " one of ");
    for (word = word ? word + 8 : ""; *word && t->count < MOST_PLACES;) {
        const size_t n = strcspn(word, " ");
        char *path = t->paths[t->count];
        (void)snprintf(path, sizeof *t->paths, "%.*s%s%.*s", parent, model->field_path,
                       dot ? "." : "", (int)n, word);
        if (bh_document_find(document, path))
            t->changes[t->count++] = (bh_edit_change){.kind = BH_EDIT_REMOVE, .path = path};
        word += n;
        word += strspn(word, " |");
    }
}

static void type_change(const bh_model *model, const char *text, struct typed *t)
{
    t->changes[0] = (bh_edit_change){
        .kind = BH_EDIT_SET, .node = model->field_node, .path = model->field_path, .text = text};
    t->count = 1;
    if (!model->field_node)
        replace_others(model, t);
}

void bh_value_attempt(bh_model *model, const char *text)
{
    bh_diags *diags = bh_diags_new();
    bh_text trial = {0};
    struct typed typed;
    size_t length = 0;
    type_change(model, text, &typed);
    const char *bytes = bh_edit_bytes(model->edit, &length);
    const bool can = diags && bh_edit_try(model->edit, typed.changes, typed.count, &trial, diags);
    copy(model->why, sizeof model->why, "");
    if (!can && diags)
        first_error(diags, model->why, sizeof model->why);
    bh_diags_free(diags);
    if (!can || trial.failed || same_text(&trial, bytes, length)) {
        bh_text_free(&trial);
        stop_trying(model);
        return;
    }
    if (model->trying && same_text(&trial, model->trial.bytes, model->trial.length)) {
        bh_text_free(&trial); /* it is being evaluated, or was */
        return;
    }
    bh_text_free(&model->trial);
    model->trial = trial;
    model->trying = true;
    model->job_due = true;
}

static bool open_field(bh_model *model, const char *path, const bh_node *node, const char *text)
{
    if (!bh_field_set(&model->field, text)) {
        bh_model_note(model, true, "this text is too long to be changed here");
        return false;
    }
    copy(model->field_path, sizeof model->field_path, path);
    model->field_node = node;
    copy(model->why, sizeof model->why, "");
    model->over = BH_OVER_FIELD;
    return true;
}

/* A text of several lines, or one that may become so. */
static bool has_lines(const bh_node *node, const char *path)
{
    return node->kind == BH_NODE_SCALAR && (node->style == BH_STYLE_BLOCK ||
                                            strcmp(path, "notes") == 0 || strchr(node->text, '\n'));
}

/* The end of the last line belongs to the form of the text, unless its heading keeps all. */
static void drop_last_end(const bh_model *model, const bh_node *node, bh_text *text)
{
    size_t length = 0;
    const char *heading = bh_edit_bytes(model->edit, &length) + node->from;
    const bool keeps = memchr(heading, '+', strcspn(heading, "\r\n")) != NULL;
    if (node->style == BH_STYLE_BLOCK && !keeps && text->length &&
        text->bytes[text->length - 1] == '\n')
        text->bytes[--text->length] = '\0';
}

static void begin_lines(bh_model *model, const char *path, const bh_press *typed, bh_text *old)
{
    const bh_node *node = bh_plan_here(model)->node;
    drop_last_end(model, node, old);
    if (!open_field(model, path, node, old->bytes))
        return;
    model->field.width = bh_field_width(model);
    if (typed) {
        (void)bh_field_press(&model->field, typed);
        bh_value_attempt(model, model->field.bytes);
    }
}

int bh_field_width(const bh_model *model)
{
    const int columns = bh_arrange(model).over_columns;
    return columns > 4 ? columns - 2 : 2;
}

void bh_value_begin(bh_model *model, const bh_press *typed)
{
    const bh_plan_line *line = bh_plan_here(model);
    bh_text old = {0}, path = {0};
    if (!line || !bh_edit_field(model->edit, line->node, &old)) {
        bh_model_note(model, true, "this part is changed line by line: Enter opens it");
        bh_text_free(&old);
        return;
    }
    bh_trail_of(line->node, &path);
    copy(model->was, sizeof model->was, old.bytes);
    model->was[strcspn(model->was, "\n")] = '\0';
    if (path.bytes && has_lines(line->node, path.bytes))
        begin_lines(model, path.bytes, typed, &old);
    else if (path.bytes && open_field(model, path.bytes, line->node, typed ? "" : old.bytes) &&
             typed) {
        (void)bh_field_press(&model->field, typed);
        bh_value_attempt(model, model->field.bytes);
    }
    bh_text_free(&path);
    bh_text_free(&old);
}

void bh_value_begin_key(bh_model *model, const char *path, const char *example)
{
    copy(model->was, sizeof model->was, "");
    if (open_field(model, path, NULL, example))
        bh_value_attempt(model, model->field.bytes);
}

void bh_value_leave(bh_model *model)
{
    model->over = BH_OVER_NOTHING;
    copy(model->why, sizeof model->why, "");
    stop_trying(model);
}

/* A value that makes the plan unreadable, or less readable than it was, is not kept. */
static bool spoils(bh_model *model)
{
    char why[sizeof model->why], other[sizeof model->why];
    const bh_text *trial = &model->trial;
    size_t length = 0;
    const char *bytes = bh_edit_bytes(model->edit, &length);
    if (!model->trying)
        return model->why[0] != '\0';
    const size_t errors = errors_of(model, trial->bytes, trial->length, why, sizeof why);
    if (errors == 0 || errors <= errors_of(model, bytes, length, other, sizeof other))
        return false;
    copy(model->why, sizeof model->why, why);
    return true;
}

/* What the worker found for the trial, or is about to find, is that of the text from now on. */
static void promote(bh_model *model)
{
    model->trying = false;
    bh_text_free(&model->trial);
    if (is_of_text(model, model->now)) {
        bh_outcome_leave(model->kept);
        model->kept = bh_outcome_share(model->now);
    }
}

bool bh_value_keep(bh_model *model, const char *text)
{
    bh_value_attempt(model, text);
    if (spoils(model))
        return false;
    if (!model->trying) { /* the same as before */
        bh_value_leave(model);
        return true;
    }
    bh_diags *diags = bh_diags_new();
    struct typed typed;
    type_change(model, text, &typed);
    const bool done = diags && bh_edit_apply(model->edit, typed.changes, typed.count, diags);
    if (!done && diags)
        first_error(diags, model->why, sizeof model->why);
    bh_diags_free(diags);
    if (!done)
        return false;
    model->over = BH_OVER_NOTHING;
    promote(model);
    bh_change_done(model);
    return true;
}

bool bh_value_press(bh_model *model, const bh_press *press)
{
    switch (press->kind) {
    case BH_PRESS_ENTER:
        (void)bh_value_keep(model, model->field.bytes);
        return true;
    case BH_PRESS_ESCAPE:
    case BH_PRESS_INTERRUPT:
        bh_value_leave(model);
        return true;
    case BH_PRESS_UP:
    case BH_PRESS_DOWN:
        if (model->field.width)
            return bh_field_press(&model->field, press);
        if (bh_field_step(&model->field, press->kind == BH_PRESS_UP ? 1 : -1))
            bh_value_attempt(model, model->field.bytes);
        return true;
    case BH_PRESS_LEFT:
    case BH_PRESS_RIGHT:
    case BH_PRESS_HOME:
    case BH_PRESS_END:
        return bh_field_press(&model->field, press);
    default:
        if (bh_field_press(&model->field, press))
            bh_value_attempt(model, model->field.bytes);
        return true;
    }
}
