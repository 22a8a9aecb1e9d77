/* session.c - the public interface: thin, so that what it does is done by the rooms below. */
#include <gsl/gsl_errno.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours.h"
#include "beamhours/base/file.h"
#include "beamhours/base/text.h"
#include "beamhours/plan/plan.h"
#include "beamhours/run/table.h"

enum { MOST_BYTES = 1024 * 1024 };

/* A change with strings of its own. */
struct change {
    char *path, *value;
};

struct bh_session {
    bh_material_library *library;
    bh_text bytes; /* the plan as it was read */
    char *name;
    struct change *changes; /* in the order they were first made */
    size_t change_count;
    bh_plan *plan;
    bh_table *table;
    char **message;
    size_t message_count;
};

bh_session *bh_session_new(const char *const *folders)
{
    (void)gsl_set_error_handler_off();
    bh_session *s = calloc(1, sizeof *s);
    if (!s)
        return NULL;
    s->library = bh_material_library_new(folders);
    if (!s->library) {
        free(s);
        return NULL;
    }
    return s;
}

static void forget_messages(bh_session *s)
{
    for (size_t i = 0; i < s->message_count; i++)
        free(s->message[i]);
    free(s->message);
    s->message = NULL;
    s->message_count = 0;
}

static void free_change(struct change *change)
{
    free(change->path);
    free(change->value);
    *change = (struct change){NULL, NULL};
}

static void forget_plan(bh_session *s)
{
    bh_table_free(s->table);
    bh_plan_free(s->plan);
    for (size_t i = 0; i < s->change_count; i++)
        free_change(&s->changes[i]);
    free(s->changes);
    free(s->name);
    bh_text_free(&s->bytes);
    s->table = NULL;
    s->plan = NULL;
    s->changes = NULL;
    s->change_count = 0;
    s->name = NULL;
}

void bh_session_free(bh_session *session)
{
    if (!session)
        return;
    forget_messages(session);
    forget_plan(session);
    bh_material_library_free(session->library);
    free(session);
}

/* Keeps one line; false when there is no memory. */
static bool keep(bh_session *s, bh_mark at, const char *kind, const char *key, const char *text)
{
    bh_text line = {0};
    char **more = realloc(s->message, (s->message_count + 1) * sizeof *more);
    if (!more)
        return false;
    s->message = more;
    bh_text_append(&line, at.file ? at.file : "-");
    if (at.line > 0)
        bh_text_appendf(&line, ":%d:%d", at.line, at.column);
    bh_text_appendf(&line, ": %s%s%s%s", kind, key, key[0] ? ": " : "", text);
    s->message[s->message_count] = bh_text_take(&line);
    s->message_count += s->message[s->message_count] != NULL;
    return true;
}

static void keep_diags(bh_session *s, const bh_diags *diags)
{
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        const char *kind = d->severity == BH_SEVERITY_WARNING ? "warning: " : "";
        if (!keep(s, d->at, kind, d->key, d->text))
            return;
    }
}

/* Reads the plan with all changes into *out; the session itself is not touched but for messages. */
static bh_result read_plan(bh_session *s, bh_plan **out)
{
    bh_diags *diags = bh_diags_new();
    bh_change *changes = calloc(s->change_count + 1, sizeof *changes);
    forget_messages(s);
    if (diags && changes) {
        for (size_t i = 0; i < s->change_count; i++)
            changes[i] = (bh_change){s->changes[i].path, s->changes[i].value};
        *out = bh_plan_read(s->bytes.bytes ? s->bytes.bytes : "", s->bytes.length, s->name, changes,
                            s->change_count, s->library, diags);
        keep_diags(s, diags);
    }
    const bh_result failed = diags && changes ? BH_BAD_PLAN : BH_NO_MEMORY;
    free(changes);
    bh_diags_free(diags);
    return *out ? BH_DONE : failed;
}

static bh_result adopt(bh_session *s, const char *name)
{
    s->name = strdup(name);
    const bh_result result = s->name && !s->bytes.failed ? read_plan(s, &s->plan) : BH_NO_MEMORY;
    if (result != BH_DONE)
        forget_plan(s);
    return result;
}

bh_result bh_session_load(bh_session *session, const char *path)
{
    bh_error err = {.code = BH_OK};
    if (!session || !path)
        return BH_BAD_CALL;
    forget_plan(session);
    forget_messages(session);
    const bh_code bad = bh_file_read(path, MOST_BYTES, &session->bytes, &err);
    if (bad) {
        (void)keep(session, (bh_mark){path, 0, 0}, "", "", err.text);
        bh_text_free(&session->bytes);
        return bad == BH_ENOMEM ? BH_NO_MEMORY : BH_NO_FILE;
    }
    return adopt(session, path);
}

bh_result bh_session_load_text(bh_session *session, const char *text, size_t length,
                               const char *name)
{
    if (!session || (!text && length) || !name)
        return BH_BAD_CALL;
    forget_plan(session);
    bh_text_append_bytes(&session->bytes, text, length);
    return adopt(session, name);
}

/* Puts the change into the list, in the place of an earlier one of the same path, whose value is
 * handed back in `old`; `value` is then the session's. */
static bool put_change(bh_session *s, const char *path, char *value, size_t *at, char **old)
{
    *old = NULL;
    for (*at = 0; *at < s->change_count; (*at)++)
        if (strcmp(s->changes[*at].path, path) == 0) {
            *old = s->changes[*at].value;
            s->changes[*at].value = value;
            return true;
        }
    struct change *more = realloc(s->changes, (s->change_count + 1) * sizeof *more);
    if (more)
        s->changes = more;
    char *copy = more ? strdup(path) : NULL;
    if (!copy)
        return false;
    struct change *last = &s->changes[s->change_count++];
    last->path = copy;
    last->value = value;
    return true;
}

static void take_back(bh_session *s, size_t at, char *old)
{
    if (old) {
        free(s->changes[at].value);
        s->changes[at].value = old;
    } else {
        free_change(&s->changes[at]);
        s->change_count--;
    }
}

bh_result bh_session_change(bh_session *session, const char *path, const char *value)
{
    size_t at = 0;
    char *old = NULL;
    bh_plan *plan = NULL;
    if (!session || !session->plan || !path || !value)
        return BH_BAD_CALL;
    char *copy = strdup(value);
    if (!copy || !put_change(session, path, copy, &at, &old)) {
        free(copy);
        return BH_NO_MEMORY;
    }
    const bh_result result = read_plan(session, &plan);
    if (result != BH_DONE) {
        take_back(session, at, old);
        return result;
    }
    free(old);
    bh_table_free(session->table);
    session->table = NULL;
    bh_plan_free(session->plan);
    session->plan = plan;
    return BH_DONE;
}

bh_result bh_session_evaluate(bh_session *session)
{
    bh_error err = {.code = BH_OK};
    const bh_evaluation how = {.bins = false};
    if (!session || !session->plan)
        return BH_BAD_CALL;
    bh_table *table = bh_table_new(session->plan, &how, NULL, &err);
    if (!table)
        return BH_NO_MEMORY;
    bh_table_free(session->table);
    session->table = table;
    forget_messages(session);
    keep_diags(session, bh_table_warnings(table));
    for (size_t i = 0; i < bh_table_cautions(table); i++) {
        const bh_caution *c = bh_table_caution(table, i);
        if (!keep(session, c->at, "caution: ", c->key, c->text))
            return BH_NO_MEMORY;
    }
    return BH_DONE;
}

size_t bh_session_rows(const bh_session *session)
{
    return session && session->table ? bh_table_rows(session->table, false) : 0;
}

/* The column, or -1 when the cell does not exist. */
static int cell(const bh_session *s, size_t row, const char *column)
{
    return column && row < bh_session_rows(s) ? bh_column_find(column) : -1;
}

double bh_session_number(const bh_session *session, size_t row, const char *column)
{
    const int id = cell(session, row, column);
    return id < 0 ? (double)NAN : bh_table_number(session->table, false, row, (bh_column_id)id);
}

const char *bh_session_text(const bh_session *session, size_t row, const char *column)
{
    const int id = cell(session, row, column);
    return id < 0 ? NULL : bh_table_text(session->table, false, row, (bh_column_id)id);
}

const char *bh_session_reason(const bh_session *session, size_t row, const char *column)
{
    const int id = cell(session, row, column);
    return id < 0 ? NULL : bh_table_reason(session->table, false, row, (bh_column_id)id);
}

const char *bh_column_key(size_t i)
{
    return i < BH_COLUMN_COUNT ? bh_column_at((int)i)->key : NULL;
}

const char *bh_column_meaning(size_t i)
{
    return i < BH_COLUMN_COUNT ? bh_column_at((int)i)->meaning : NULL;
}

size_t bh_session_messages(const bh_session *session)
{
    return session ? session->message_count : 0;
}

const char *bh_session_message(const bh_session *session, size_t i)
{
    return i < bh_session_messages(session) ? session->message[i] : NULL;
}
