/* fuzz_edit.c - any text, any changes: no crash; what is not meant stays; undoing gives the bytes
 * back.
 *
 * The text ends with a NUL; behind it stand changes: a byte for the kind, one for the place, a
 * path, a NUL, a text, a NUL. */
#include <stddef.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/document/edit.h"
#include "beamhours/document/trail.h"

enum { MOST = 16, KINDS = 8 /* six kinds of change, undo, redo */ };

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size);

struct text {
    const char *bytes;
    size_t length;
};

static void demand(int truth)
{
    if (!truth)
        abort();
}

static struct text now(const bh_edit *edit)
{
    struct text t = {NULL, 0};
    t.bytes = bh_edit_bytes(edit, &t.length);
    return t;
}

static char *copied(struct text t)
{
    char *copy = malloc(t.length + 1);
    demand(copy != NULL);
    memcpy(copy, t.bytes, t.length);
    copy[t.length] = '\0';
    return copy;
}

static size_t count_nodes(const bh_node *node)
{
    size_t n = 1;
    for (size_t i = 0; i < node->count; i++)
        n += count_nodes(node->items[i]);
    return n;
}

static const bh_node *root(const bh_edit *edit)
{
    return bh_document_root(bh_edit_document(edit));
}

/* What each kind of change does to the number of values. */
static void check_count(const bh_edit *edit, const bh_edit_change *c, size_t before)
{
    const size_t after = count_nodes(root(edit));
    if (c->kind == BH_EDIT_RENAME || c->kind == BH_EDIT_MOVE)
        demand(after == before);
    else if (c->kind == BH_EDIT_INSERT || c->kind == BH_EDIT_DUPLICATE)
        demand(after > before);
    else if (c->kind == BH_EDIT_REMOVE)
        demand(after < before);
}

static void change(bh_edit *edit, const bh_edit_change *c, bh_diags *diags)
{
    char *before = copied(now(edit));
    const size_t nodes = count_nodes(root(edit)), told = bh_diags_count(diags);
    const size_t steps = bh_edit_done(edit);
    const int done = bh_edit_apply(edit, c, 1, diags);
    demand(done == (bh_diags_count(diags) == told));
    if (done)
        check_count(edit, c, nodes);
    else
        demand(strcmp(before, now(edit).bytes) == 0);
    if (bh_edit_done(edit) > steps) { /* the lines that the step does not name are the same */
        const bh_edit_step *s = bh_edit_step_at(edit, steps);
        demand(s->line >= 1 && s->lines_before >= 1 && s->lines_after >= 1 && s->text[0]);
    }
    free(before);
}

static void play(bh_edit *edit, struct text rest, bh_diags *diags)
{
    bh_edit_range ranges[4];
    for (int i = 0; i < MOST && rest.length > 4; i++) {
        const unsigned kind = (unsigned char)rest.bytes[0] % KINDS;
        const size_t place = (unsigned char)rest.bytes[1] % 8;
        const char *path = rest.bytes + 2, *text = path + strlen(path) + 1;
        const char *end = rest.bytes + rest.length;
        if (text >= end)
            return;
        const bh_edit_change c = {(bh_edit_kind)kind, path, text, place, NULL};
        if (kind == KINDS - 2)
            (void)bh_edit_undo(edit, diags);
        else if (kind == KINDS - 1)
            (void)bh_edit_redo(edit, diags);
        else
            change(edit, &c, diags);
        const size_t count = bh_edit_changed(edit, ranges, 4);
        demand((count == 0) == (bh_edit_unsaved(edit) == 0));
        rest.length = (size_t)(end - text) - strlen(text);
        rest.bytes = text + strlen(text);
        if (rest.length == 0)
            return;
        rest.bytes++;
        rest.length--;
    }
}

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    char *copy = copied((struct text){(const char *)data, size});
    const size_t length = strlen(copy);
    bh_diags *diags = bh_diags_new(), *calm = bh_diags_new();
    demand(diags != NULL && calm != NULL);
    bh_edit *edit = bh_edit_open(copy, length, "fuzz", diags);
    demand((edit == NULL) == (bh_diags_errors(diags) > 0));
    if (edit && length < size)
        play(edit, (struct text){copy + length + 1, size - length - 1}, calm);
    while (edit && bh_edit_undo(edit, calm))
        ;
    if (edit)
        demand(now(edit).length == length && memcmp(now(edit).bytes, copy, length) == 0);
    bh_edit_free(edit);
    bh_diags_free(diags);
    bh_diags_free(calm);
    free(copy);
    return 0;
}
