/* giving.c - a value or a key written where it belongs: what was typed, in the form that is there.
 */
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/document/form.h"
#include "beamhours/document/layout.h"
#include "beamhours/document/scalar.h"
#include "beamhours/document/splice.h"

/* A value on its way. */
struct giving {
    bh_splice *s;
    char *text;       /* what was typed; blanks around it are gone where it is not in quotes */
    const char *rest; /* keys to be put around it */
    bool flow;        /* it stands within brackets */
    bh_node scalar;   /* what is meant: this, */
    bh_document *own; /* or the root of this */
    bh_text value;    /* what is written */
};

static bool refuse(const struct giving *g)
{
    const bh_target *t = &g->s->target;
    const bh_node *node = t->node ? t->node : t->around;
    if (!g->s->lost)
        BH_TARGET_REFUSE(g->s->diags, node, BH_REFUSE_MORE);
    return false;
}

/* --- what is typed --- */

static char *copied(const char *text, bool trimmed)
{
    size_t length = strlen(text);
    while (trimmed && length > 0 && strchr(" \t\n", text[length - 1]))
        length--;
    const size_t skip = trimmed ? strspn(text, " \t\n") : 0;
    const size_t keep = length > skip ? length - skip : 0;
    char *copy = malloc(keep + 1);
    if (!copy)
        return NULL;
    memcpy(copy, text + (keep ? skip : 0), keep);
    copy[keep] = '\0';
    return copy;
}

/* Reads a text as a document of its own: one list or mapping in brackets, or one text in quotes,
 * with nothing around it.  Else NULL. */
static bh_document *read_alone(struct giving *g, const char *text)
{
    const size_t length = strlen(text);
    bh_diags *said = bh_diags_new();
    bh_document *own = said ? bh_document_parse(text, length, "", said) : NULL;
    g->s->lost = g->s->lost || !said;
    bh_diags_free(said);
    const bh_node *root = own ? bh_document_root(own) : NULL;
    const bool one = root && root->from == 0 && root->to == length &&
                     (root->style == BH_STYLE_FLOW || root->style == BH_STYLE_QUOTED);
    if (own && !one) {
        bh_document_free(own);
        own = NULL;
    }
    return own;
}

/* Appends the keys of `rest` with brackets around each, and the value in them. */
static void wrap(const char *rest, bh_form form, const char *text, bh_text *into)
{
    size_t depth = 0;
    while (*rest) {
        const size_t length = strcspn(rest, ".");
        bh_text key = {0};
        bh_text_append_bytes(&key, rest, length);
        bh_text_append(into, "{");
        if (!key.failed)
            bh_form_append(bh_form_choose(key.bytes, true), key.bytes, into);
        into->failed = into->failed || key.failed;
        bh_text_append(into, ": ");
        bh_text_free(&key);
        rest += length;
        rest += *rest == '.';
        depth++;
    }
    bh_form_append(form, text, into);
    for (; depth > 0; depth--)
        bh_text_append(into, "}");
}

/* Writes the value in one form and says what is meant by it. */
static bool write_value(struct giving *g, bh_form form)
{
    bh_text_free(&g->value);
    bh_document_free(g->own);
    g->own = NULL;
    wrap(g->rest, form, g->text, &g->value);
    g->scalar = (bh_node){.kind = BH_NODE_SCALAR, .text = g->text, .length = strlen(g->text)};
    g->s->meant.value = &g->scalar;
    if (g->value.failed) {
        g->s->lost = true;
        return false;
    }
    if (form != BH_FORM_AS_IT_IS && !*g->rest)
        return true;
    g->own = read_alone(g, g->value.bytes);
    g->s->meant.value = g->own ? bh_document_root(g->own) : NULL;
    return g->own != NULL;
}

/* --- where it goes --- */

/* The value in place of bytes of the document. */
static bool try_cut(struct giving *g, bh_cut cut, const char *before)
{
    bh_text with = {0}, proposed = {0};
    bh_text_append(&with, before);
    bh_text_append_bytes(&with, g->value.bytes, g->value.length);
    cut.with = with.bytes;
    cut.length = with.length;
    if (!with.failed)
        bh_cuts_make(g->s->text, &cut, 1, &proposed);
    proposed.failed = proposed.failed || with.failed;
    bh_text_free(&with);
    return bh_splice_settle(g->s, &proposed);
}

/* Behind the colon of the key of a mapping's value; SIZE_MAX where there is none. */
static size_t behind_colon(const struct giving *g)
{
    const bh_target *t = &g->s->target;
    const bh_bytes text = g->s->text;
    size_t at = t->around->keys ? t->around->keys[t->index]->to : SIZE_MAX;
    while (at < text.length && strchr(" \t", text.bytes[at]))
        at++;
    return at < text.length && text.bytes[at] == ':' ? at + 1 : SIZE_MAX;
}

/* Where there is no value yet. */
static bool try_empty(struct giving *g)
{
    const bh_target *t = &g->s->target;
    const size_t colon = behind_colon(g);
    if (!t->around->keys)
        return try_cut(g, (bh_cut){.from = t->node->from, .to = t->node->from}, " ");
    if (colon != SIZE_MAX)
        return try_cut(g, (bh_cut){.from = colon, .to = colon}, " ");
    const size_t end = t->around->keys[t->index]->to;
    return try_cut(g, (bh_cut){.from = end, .to = end}, ": ");
}

/* In place of a list or mapping by lines, which has no comments. */
static bool try_lines(struct giving *g)
{
    const bh_node *node = g->s->target.node;
    const size_t colon = behind_colon(g);
    if (colon == SIZE_MAX)
        return try_cut(g, (bh_cut){.from = node->from, .to = node->to}, "");
    return try_cut(g, (bh_cut){.from = colon, .to = node->to}, " ");
}

/* A new key at the end of the mapping, or where it was asked for. */
static bool try_new(struct giving *g, const char *key)
{
    bh_splice *s = g->s;
    const bh_node *around = s->target.around;
    const bh_layout layout = {s->text, around, s->pieces};
    bh_text unit = {0}, proposed = {0};
    if (around->kind == BH_NODE_MAPPING) {
        bh_form_append(bh_form_choose(key, g->flow), key, &unit);
        bh_text_append(&unit, ": ");
    }
    bh_text_append_bytes(&unit, g->value.bytes, g->value.length);
    const bh_unit what = {.bytes = unit.bytes, .length = unit.length};
    const bool done = !unit.failed && bh_layout_insert(&layout, s->meant.place, &what, &proposed);
    proposed.failed = proposed.failed || unit.failed;
    bh_text_free(&unit);
    if (done || proposed.failed)
        return bh_splice_settle(s, &proposed);
    bh_text_free(&proposed);
    return false;
}

static bool try_value(struct giving *g, const char *key)
{
    const bh_node *node = g->s->target.node;
    if (!node)
        return try_new(g, key);
    if (bh_node_empty(node))
        return try_empty(g);
    if (node->kind != BH_NODE_SCALAR && node->style == BH_STYLE_BLOCK)
        return try_lines(g);
    return try_cut(g, (bh_cut){.from = node->from, .to = node->to}, "");
}

/* The forms that are tried: first the one that is there, then the plainest, then quotes. */
static bool try_forms(struct giving *g, const bh_form *first, const char *key)
{
    const bool flow = g->flow || *g->rest;
    bh_form forms[4] = {0};
    size_t count = 0;
    if (first && bh_form_fits(*first, g->text, flow))
        forms[count++] = *first;
    if (!first && g->text[0] && strchr("[{\"'", g->text[0]))
        forms[count++] = BH_FORM_AS_IT_IS;
    if (!first)
        forms[count++] = bh_form_choose(g->text, flow);
    forms[count++] = BH_FORM_DOUBLE;
    for (size_t i = 0; i < count && !g->s->lost; i++)
        if (write_value(g, forms[i]) && try_value(g, key))
            return true;
    return refuse(g);
}

/* --- under | or > --- */

/* Writes all of it, or only the paragraphs that change. */
static bool try_block(struct giving *g, bool all)
{
    bh_block block = {0};
    bh_text proposed = {0};
    bh_splice *s = g->s;
    bool fits = bh_form_block(s->text, s->target.node, g->text, all, &block);
    s->lost = s->lost || block.written.failed || block.value.failed;
    if (fits && !s->lost) {
        g->scalar = (bh_node){
            .kind = BH_NODE_SCALAR, .text = block.value.bytes, .length = block.value.length};
        s->meant.value = &g->scalar;
        const bh_cut cut = {block.from, block.to, block.written.bytes, block.written.length};
        bh_cuts_make(s->text, &cut, 1, &proposed);
        fits = bh_splice_settle(s, &proposed);
    }
    bh_text_free(&block.written);
    bh_text_free(&block.value);
    return fits && !s->lost;
}

static bool give_block(struct giving *g)
{
    const bh_splice *s = g->s;
    if (try_block(g, false) || (!s->lost && try_block(g, true)))
        return true;
    if (!s->lost)
        bh_diags_add(s->diags, BH_SEVERITY_ERROR, s->target.node->at,
                     bh_target_call(s->target.node).text, BH_REFUSE_BLOCK);
    return false;
}

/* --- a value --- */

static bool has_comments(const struct giving *g)
{
    const bh_node *node = g->s->target.node;
    const size_t colon = behind_colon(g), from = colon == SIZE_MAX ? node->from : colon;
    for (size_t i = from; i < node->to; i++)
        if (g->s->text.bytes[i] == '#' && strchr(" \t\n", g->s->text.bytes[i - 1]))
            return true;
    return false;
}

static bool give(struct giving *g, const char *key)
{
    const bh_node *node = g->s->target.node;
    const bool scalar = node && node->kind == BH_NODE_SCALAR;
    if (scalar && node->style == BH_STYLE_BLOCK)
        return give_block(g);
    if (node && !scalar && node->style == BH_STYLE_BLOCK && has_comments(g)) {
        BH_TARGET_REFUSE(g->s->diags, node, BH_REFUSE_PARTS);
        return false;
    }
    if (scalar && node->style == BH_STYLE_QUOTED) {
        const char quote = g->s->text.bytes[node->from];
        const bh_form form = quote == '\'' ? BH_FORM_SINGLE : BH_FORM_DOUBLE;
        return try_forms(g, &form, key);
    }
    return try_forms(g, NULL, key);
}

/* The first part of a path as a string of its own; `rest` moves behind it. */
static char *first_part(const char **rest)
{
    const size_t length = strcspn(*rest, ".");
    char *part = malloc(length + 1);
    if (part) {
        memcpy(part, *rest, length);
        part[length] = '\0';
        *rest += length;
        *rest += **rest == '.';
    }
    return part;
}

/* Splits `key: value`; NULL where there is no colon. */
static char *split_pair(const char *text, const char **value)
{
    const char *colon = strstr(text, ": ");
    const size_t length = colon ? (size_t)(colon - text) : 0;
    char *key = colon ? malloc(length + 1) : NULL;
    if (key) {
        memcpy(key, text, length);
        key[length] = '\0';
        *value = colon + 2;
    }
    return key;
}

static bool place_new(bh_splice *s)
{
    const size_t count = s->target.around->count + 1;
    const size_t place = s->change->place ? s->change->place : count;
    if (place > count) {
        bh_diags_add(s->diags, BH_SEVERITY_ERROR, s->target.around->at,
                     bh_target_call(s->target.around).text, BH_REFUSE_PLACE, place, count, count);
        return false;
    }
    s->meant.place = place - 1;
    s->meant.count = count;
    for (size_t i = 0; i < count; i++)
        s->from[i] = i < place ? i : i - 1;
    s->from[place - 1] = 0;
    return true;
}

/* What is needed before the value can be written: its key where it is new. */
static bool begin(struct giving *g, const char **value, char **key)
{
    bh_splice *s = g->s;
    const bool mapping = s->target.around->kind == BH_NODE_MAPPING;
    if (s->target.node)
        return true;
    if (!place_new(s))
        return false;
    if (!mapping)
        return true;
    *key = s->change->kind == BH_EDIT_SET ? first_part(&g->rest) : split_pair(*value, value);
    if (!*key && s->change->kind == BH_EDIT_INSERT && !strstr(*value, ": ")) {
        bh_diags_add(s->diags, BH_SEVERITY_ERROR, s->target.around->at,
                     bh_target_call(s->target.around).text, BH_REFUSE_NO_COLON, *value);
        return false;
    }
    s->lost = s->lost || !*key;
    s->meant.key = *key;
    return *key && bh_splice_key(s, *key);
}

bool bh_splice_set(bh_splice *splice)
{
    const bh_node *node = splice->target.node;
    const bool exact = node && node->kind == BH_NODE_SCALAR && node->style != BH_STYLE_PLAIN;
    struct giving g = {.s = splice, .rest = splice->target.rest};
    g.flow = bh_splice_in_brackets(splice->target.around);
    const char *value = splice->change->text ? splice->change->text : "";
    char *key = NULL;
    bool done = begin(&g, &value, &key);
    if (done) {
        g.text = copied(value, !exact);
        splice->lost = splice->lost || !g.text;
        done = g.text && give(&g, key);
    }
    splice->meant.value = NULL; /* what it meant goes */
    splice->meant.key = NULL;
    free(key);
    free(g.text);
    bh_text_free(&g.value);
    bh_document_free(g.own);
    return done;
}

/* --- a key --- */

bool bh_splice_rename(bh_splice *splice)
{
    const bh_target *t = &splice->target;
    const char *text = splice->change->text;
    if (!t->around->keys) {
        BH_TARGET_REFUSE(splice->diags, t->node, BH_REFUSE_NO_KEY);
        return false;
    }
    const bh_node *key = t->around->keys[t->index];
    if (text && strcmp(text, key->text) != 0 && !bh_splice_key(splice, text))
        return false;
    if (!text || !*text)
        return bh_splice_key(splice, text);
    bh_form form = bh_form_choose(text, bh_splice_in_brackets(t->around));
    if (key->style == BH_STYLE_QUOTED)
        form = splice->text.bytes[key->from] == '\'' ? BH_FORM_SINGLE : BH_FORM_DOUBLE;
    bh_text with = {0}, proposed = {0};
    bh_form_append(form, text, &with);
    const bh_cut cut = {key->from, key->to, with.bytes, with.length};
    if (!with.failed)
        bh_cuts_make(splice->text, &cut, 1, &proposed);
    proposed.failed = proposed.failed || with.failed;
    bh_text_free(&with);
    splice->meant.key = text;
    struct giving g = {.s = splice};
    return bh_splice_settle(splice, &proposed) || refuse(&g);
}
