/* fuzz_document.c - any bytes: no crash, marks inside the text, spans inside and in order.
 *
 * A NUL ends the document; behind it stand a path, a NUL and a value to be grafted. */
#include <stddef.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/document/node.h"

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

/* The columns that line `line` has at most, its end included; 0 where there is no such line. */
static size_t columns(struct text t, int line)
{
    size_t from = 0;
    for (int i = 1; i < line; i++) {
        const char *end = from < t.length ? memchr(t.bytes + from, '\n', t.length - from) : NULL;
        if (!end)
            return 0;
        from = (size_t)(end - t.bytes) + 1;
    }
    const char *end = memchr(t.bytes + from, '\n', t.length - from);
    return (end ? (size_t)(end - t.bytes) : t.length) - from + 1;
}

static void check_mark(struct text t, bh_mark at)
{
    demand(at.line >= 0 && at.column >= 0);
    if (at.line > 0)
        demand((size_t)at.column <= columns(t, at.line));
}

static void check_diags(struct text t, bh_diags *diags)
{
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        demand(d->key && d->key[0] && d->text && d->text[0]);
        if (strcmp(d->at.file, "fuzz") == 0 && i < 100)
            check_mark(t, d->at);
    }
}

/* `from` is where the last node ended; returns where this one does. */
static size_t check_node(struct text t, const bh_node *node, size_t from)
{
    demand(node->from >= from && node->to >= node->from && node->to <= t.length);
    if (t.length < 4096)
        check_mark(t, node->at);
    size_t last = node->from;
    for (size_t i = 0; i < node->count; i++) {
        if (node->keys) {
            demand(node->keys[i]->kind == BH_NODE_SCALAR && node->keys[i]->parent == node);
            last = check_node(t, node->keys[i], last);
        }
        demand(node->items[i]->parent == node);
        last = check_node(t, node->items[i], last);
    }
    demand(last <= node->to);
    if (node->kind == BH_NODE_SCALAR)
        demand(node->text && strlen(node->text) == node->length);
    return node->to;
}

static void graft(bh_document *document, struct text rest, bh_diags *diags)
{
    char *path = calloc(rest.length + 2, 1);
    demand(path != NULL);
    memcpy(path, rest.bytes, rest.length);
    const char *value = path + strlen(path) + 1;
    const size_t before = bh_diags_errors(diags);
    const bh_node *node = bh_document_graft(document, path, value, "--with 1", diags);
    demand((node == NULL) == (bh_diags_errors(diags) > before));
    if (node) {
        demand(node->from == 0 && node->to == 0 && node->parent != NULL);
        demand(strcmp(node->at.file, "--with 1") == 0);
        const bh_node *root = bh_document_root(document);
        if (root->kind == BH_NODE_MAPPING && root->count > 0)
            bh_document_drop(document, root, root->keys[0]->text);
    }
    free(path);
}

int LLVMFuzzerTestOneInput(const uint8_t *data, size_t size)
{
    const uint8_t *nul = size ? memchr(data, 0, size) : NULL;
    const struct text whole = {(const char *)data, size};
    const struct text t = {whole.bytes, nul ? (size_t)(nul - data) : size};
    bh_diags *diags = bh_diags_new();
    demand(diags != NULL);
    bh_document *document = bh_document_parse(t.bytes, t.length, "fuzz", diags);
    demand((document == NULL) == (bh_diags_errors(diags) > 0));
    if (document) {
        (void)check_node(t, bh_document_root(document), 0);
        if (nul)
            graft(document, (struct text){t.bytes + t.length + 1, size - t.length - 1}, diags);
    }
    check_diags(t, diags);
    bh_diags_sort(diags);
    bh_diags_free(diags);
    bh_document_free(document);
    return 0;
}
