/* note.c - a change in a few words, and what changed as it is called afterwards. */
#include "beamhours/document/note.h"

#include <string.h>

#include "beamhours/document/scalar.h"
#include "beamhours/document/source.h"
#include "beamhours/document/trail.h"

enum { SHORT = 32 };

/* The list or mapping that changed, in the document after. */
static const bh_node *around_after(const bh_splice *made)
{
    size_t places[BH_NESTING_LIMIT + 1];
    size_t depth = 0;
    for (const bh_node *n = made->target.around; n->parent && depth <= BH_NESTING_LIMIT;
         n = n->parent)
        places[depth++] = bh_node_place(n);
    const bh_node *node = bh_document_root(made->after);
    while (depth > 0)
        node = node->items[places[--depth]];
    return node;
}

/* Appends what a value looks like, on one line and not long. */
static void append_short(const bh_document *document, const bh_node *node, bh_text *note)
{
    bh_bytes text = {0};
    char out[SHORT];
    text.bytes = bh_document_bytes(document, &text.length);
    const bh_cursor cursor = {.bytes = text.bytes, .length = text.length};
    if (node->kind == BH_NODE_SCALAR)
        bh_scalar_short(node->text + strspn(node->text, "\n"), out, sizeof out);
    else
        bh_source_excerpt(&cursor, node->from, node->to, out, sizeof out);
    bh_text_append(note, out);
}

static void append_name(const bh_node *node, bh_text *note)
{
    bh_text path = {0};
    bh_trail_of(node, &path);
    note->failed = note->failed || path.failed;
    if (!path.failed) {
        char out[2 * SHORT];
        bh_scalar_short(path.length ? path.bytes : "plan", out, sizeof out);
        bh_text_append(note, out);
    }
    bh_text_free(&path);
}

static void note_value(const bh_splice *made, const bh_node *after, bh_text *note)
{
    append_name(after, note);
    bh_text_append(note, ": ");
    if (made->target.node) {
        append_short(made->before, made->target.node, note);
        bh_text_append(note, " -> ");
    }
    append_short(made->after, after, note);
    if (!made->target.node)
        bh_text_append(note, " added");
}

const bh_node *bh_note_node(const bh_splice *made)
{
    const bh_node *around = around_after(made);
    return made->meant.place < around->count ? around->items[made->meant.place] : around;
}

void bh_note_change(const bh_splice *made, bh_text *note, bh_text *path)
{
    const bh_node *after = bh_note_node(made);
    bh_trail_of(after, path);
    switch (made->change->kind) {
    case BH_EDIT_RENAME:
        append_name(made->target.node, note);
        bh_text_append(note, " -> ");
        bh_text_append(note, after->parent->keys[made->meant.place]->text);
        break;
    case BH_EDIT_DUPLICATE:
        append_name(made->target.node, note);
        bh_text_append(note, " again");
        break;
    case BH_EDIT_REMOVE:
        append_name(made->target.node, note);
        bh_text_append(note, " removed");
        break;
    case BH_EDIT_MOVE:
        append_name(made->target.node, note);
        bh_text_appendf(note, " moved from %zu to %zu", made->target.index + 1,
                        made->meant.place + 1);
        break;
    default:
        note_value(made, after, note);
    }
}
