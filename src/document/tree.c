/* tree.c - YAML events to nodes.  Nodes wait in one list until the list or mapping they belong to
 * is complete; only then is it known how many there are. */
#include "beamhours/document/tree.h"

#include <stdlib.h>
#include <string.h>
#include <yaml.h>

#include "beamhours/base/sentences.h"
#include "beamhours/base/text.h"
#include "beamhours/document/keys.h"
#include "beamhours/document/scalar.h"
#include "beamhours/document/source.h"
#include "beamhours/document/syntax.h"

enum { SNIPPET = 32, FIRST_ROOM = 256 };

/* A list or mapping that is not complete. */
struct frame {
    bh_node *node;
    size_t first; /* its first node in `waiting`; keys and values alternate */
};

struct builder {
    const bh_tree_job *job;
    yaml_parser_t parser;
    bh_cursor cursor;
    bh_node **waiting; /* never NULL */
    size_t count, room;
    struct frame frames[BH_NESTING_LIMIT];
    size_t depth;
    bh_text path; /* of the last complaint */
    bh_tree tree;
    bool begun; /* a document has */
    bool wrong; /* there will be no tree */
    bool ended; /* nothing more can be read */
};

/* Where an event stands. */
struct span {
    bh_mark at;
    size_t from, to;
};

/* --- complaints --- */

static void lose(struct builder *b)
{
    bh_diags_lose(b->job->diags);
    b->wrong = b->ended = true;
}

/* The dotted path of the innermost list or mapping or, with `inside`, of what is being read in it.
 * Good until the next call. */
static const char *path_here(struct builder *b, bool inside)
{
    bh_text *path = &b->path;
    char key[SNIPPET];
    path->length = 0;
    bh_text_append(path, b->job->path);
    for (size_t i = 0; i + !inside < b->depth; i++) {
        const struct frame *f = &b->frames[i];
        /* The node of the next frame waits itself, just before what is in it. */
        const size_t end = i + 1 < b->depth ? b->frames[i + 1].first - 1 : b->count;
        const char *dot = path->length ? "." : "";
        if (f->node->kind == BH_NODE_LIST) {
            bh_text_appendf(path, "%s%zu", dot, end - f->first + 1);
        } else if ((end - f->first) % 2 == 1) {
            bh_scalar_short(b->waiting[end - 1]->text, key, sizeof key);
            bh_text_appendf(path, "%s%s", dot, key);
        }
    }
    if (path->failed)
        lose(b);
    return path->failed ? "" : path->bytes;
}

#define SAY(b, at, ...) \
    ((b)->wrong = true, \
     bh_diags_add((b)->job->diags, BH_SEVERITY_ERROR, at, path_here(b, false), __VA_ARGS__))

/* --- the text behind a node --- */

static struct span span_of(struct builder *b, const yaml_event_t *event)
{
    struct span s;
    bh_cursor_go(&b->cursor, event->start_mark.line, event->start_mark.column);
    s.at = b->cursor.at;
    s.from = b->cursor.byte;
    bh_cursor_go(&b->cursor, event->end_mark.line, event->end_mark.column);
    s.to = b->cursor.byte > s.from ? b->cursor.byte : s.from;
    return s;
}

static void warn_if_cut(struct builder *b, const struct span *s)
{
    char text[SNIPPET];
    if (!bh_scalar_looks_cut(b->job->bytes, s->from, s->to))
        return;
    bh_source_excerpt(&b->cursor, s->to + 1, b->job->length, text, sizeof text);
    bh_mark at = b->cursor.at; /* still where the text ended */
    at.column++;
    bh_diags_add(b->job->diags, BH_SEVERITY_WARNING, at, path_here(b, true), BH_WARN_CUT, text);
}

/* --- nodes --- */

static void set_span(struct builder *b, bh_node *node, const struct span *s)
{
    if (b->depth == 0) {
        b->tree.from = s->from;
        b->tree.to = s->to;
    }
    if (b->job->spans) {
        node->from = s->from;
        node->to = s->to;
    }
}

static bh_node *new_node(struct builder *b, bh_node_kind kind, const struct span *s)
{
    bh_node *node = bh_arena_take(b->job->arena, 1, sizeof *node);
    if (!node) {
        lose(b);
        return NULL;
    }
    node->kind = kind;
    node->at = s->at;
    set_span(b, node, s);
    return node;
}

static bool wait_in_line(struct builder *b, bh_node *node)
{
    if (b->count == b->room) {
        const size_t room = 2 * b->room;
        bh_node **grown = realloc(b->waiting, room * sizeof(bh_node *));
        if (!grown) {
            lose(b);
            return false;
        }
        b->waiting = grown;
        b->room = room;
    }
    b->waiting[b->count++] = node;
    return true;
}

/* Is a key to come next? */
static bool key_comes(const struct builder *b)
{
    if (b->depth == 0)
        return false;
    const struct frame *f = &b->frames[b->depth - 1];
    return f->node->kind == BH_NODE_MAPPING && (b->count - f->first) % 2 == 0;
}

/* Gives a node its place: the root, or one in the innermost list or mapping. */
static bool put(struct builder *b, bh_node *node)
{
    if (b->depth == 0) {
        b->tree.root = node;
        return true;
    }
    node->parent = b->frames[b->depth - 1].node;
    return wait_in_line(b, node);
}

static void check_key(struct builder *b, const bh_node *key)
{
    if (key->length == 0)
        SAY(b, key->at, BH_SAY_KEY_EMPTY);
    else if (key->style == BH_STYLE_PLAIN && strcmp(key->text, "<<") == 0)
        SAY(b, key->at, BH_SAY_MERGE);
}

/* `{a:1}` is read as a key `a:1` without a value. */
static void check_value(struct builder *b, const bh_node *value)
{
    const bh_node *around = b->depth ? b->frames[b->depth - 1].node : NULL;
    if (!around || !bh_node_empty(value) || around->kind != BH_NODE_MAPPING ||
        around->style != BH_STYLE_FLOW)
        return;
    const bh_node *key = b->waiting[b->count - 1];
    const size_t first = b->frames[b->depth - 1].first;
    const bh_node *before = b->count >= first + 2 ? b->waiting[b->count - 2] : NULL;
    if (key->style == BH_STYLE_PLAIN && strchr(key->text, ':'))
        SAY(b, key->at, BH_SAY_COLON_TIGHT);
    else if (before && bh_scalar_comma_parts(before, key))
        SAY(b, before->at, BH_SAY_COMMA_PARTS, before->text, key->text);
}

static void refuse_extras(struct builder *b, const struct span *s, bool anchor, bool tag)
{
    char text[SNIPPET];
    const size_t word = strcspn(b->job->bytes + s->from, " \t\r\n,]}");
    bh_source_excerpt(&b->cursor, s->from, s->from + word, text, sizeof text);
    if (anchor)
        SAY(b, s->at, BH_SAY_ANCHOR, text);
    else if (tag)
        SAY(b, s->at, BH_SAY_TAG, text);
}

static void add_scalar(struct builder *b, const yaml_event_t *event)
{
    struct span s = span_of(b, event);
    const char *value = (const char *)event->data.scalar.value;
    const size_t length = event->data.scalar.length;
    const bh_node_style style = bh_event_style(event);
    const bool is_key = key_comes(b);
    uint32_t point = 0;
    refuse_extras(b, &s, event->data.scalar.anchor, event->data.scalar.tag);
    if (bh_scalar_hidden(value, length, &point))
        SAY(b, s.at, BH_SAY_HIDDEN, (unsigned)point);
    if (style == BH_STYLE_BLOCK)
        s.to = bh_scalar_trimmed(b->job->bytes, s.from, s.to);
    bh_node *node = new_node(b, BH_NODE_SCALAR, &s);
    if (!node)
        return;
    node->style = style;
    node->length = length;
    node->text = bh_tree_copy(b->job->arena, value, length);
    if (!node->text) {
        lose(b);
        return;
    }
    if (style == BH_STYLE_PLAIN && !is_key)
        warn_if_cut(b, &s);
    if (is_key)
        check_key(b, node);
    else
        check_value(b, node);
    (void)put(b, node);
}

static void refuse_alias(struct builder *b, const yaml_event_t *event)
{
    char text[SNIPPET];
    const struct span s = span_of(b, event);
    bh_source_excerpt(&b->cursor, s.from, s.to, text, sizeof text);
    SAY(b, s.at, BH_SAY_ALIAS, text);
    bh_node *node = new_node(b, BH_NODE_SCALAR, &s); /* keeps keys and values apart */
    if (node) {
        node->text = "";
        (void)put(b, node);
    }
}

/* --- lists and mappings --- */

static void open_node(struct builder *b, const yaml_event_t *event)
{
    const bool list = event->type == YAML_SEQUENCE_START_EVENT;
    const struct span s = span_of(b, event);
    if (list)
        refuse_extras(b, &s, event->data.sequence_start.anchor, event->data.sequence_start.tag);
    else
        refuse_extras(b, &s, event->data.mapping_start.anchor, event->data.mapping_start.tag);
    if (key_comes(b)) {
        SAY(b, s.at, BH_SAY_KEY_NO_WORD);
        b->ended = true;
        return;
    }
    if (b->depth + (size_t)b->job->depth >= BH_NESTING_LIMIT) {
        SAY(b, s.at, BH_SAY_DEPTH, BH_NESTING_LIMIT);
        b->ended = true;
        return;
    }
    bh_node *node = new_node(b, list ? BH_NODE_LIST : BH_NODE_MAPPING, &s);
    if (!node)
        return;
    node->style = bh_event_style(event);
    if (put(b, node))
        b->frames[b->depth++] = (struct frame){node, b->count};
}

/* Sorts `keys` and complains of equal ones. */
static void refuse_equal(struct builder *b, bh_node **keys, size_t count)
{
    bh_keys_sort(keys, count);
    char key[SNIPPET];
    for (size_t i = 1, first = 0; i < count; i++) {
        first = strcmp(keys[i]->text, keys[first]->text) ? i : first;
        if (first == i || keys[i]->length == 0)
            continue;
        bh_scalar_short(keys[i]->text, key, sizeof key);
        SAY(b, keys[i]->at, BH_SAY_KEY_TWICE, key, keys[first]->at.line);
    }
}

static void close_node(struct builder *b, const yaml_event_t *event)
{
    const struct frame *f = &b->frames[b->depth - 1];
    bh_node *node = f->node;
    struct span s = span_of(b, event);
    if (!bh_node_fill(b->job->arena, node, b->waiting + f->first, b->count - f->first)) {
        lose(b);
        return;
    }
    if (node->kind == BH_NODE_MAPPING) {
        for (size_t i = 0; i < node->count; i++)
            b->waiting[f->first + i] = node->keys[i]; /* to be sorted */
        refuse_equal(b, b->waiting + f->first, node->count);
    }
    /* The parser lets a block run over the comments behind it; its last value knows better. */
    if (node->style == BH_STYLE_BLOCK && node->count > 0)
        s.to = node->items[node->count - 1]->to;
    b->count = f->first;
    b->depth--;
    s.from = b->depth ? node->from : b->tree.from;
    set_span(b, node, &s);
}

/* --- the run of events --- */

static void begin_document(struct builder *b, const yaml_event_t *event)
{
    const struct span s = span_of(b, event);
    if (b->begun) {
        SAY(b, s.at, BH_SAY_SECOND_DOCUMENT);
        b->ended = true;
    } else if (bh_event_directives(event)) {
        SAY(b, s.at, BH_SAY_DIRECTIVE);
    }
    b->begun = true;
}

static void take(struct builder *b, const yaml_event_t *event)
{
    switch (event->type) {
    case YAML_DOCUMENT_START_EVENT:
        begin_document(b, event);
        break;
    case YAML_SCALAR_EVENT:
        add_scalar(b, event);
        break;
    case YAML_ALIAS_EVENT:
        refuse_alias(b, event);
        break;
    case YAML_SEQUENCE_START_EVENT:
    case YAML_MAPPING_START_EVENT:
        open_node(b, event);
        break;
    case YAML_SEQUENCE_END_EVENT:
    case YAML_MAPPING_END_EVENT:
        close_node(b, event);
        break;
    case YAML_STREAM_END_EVENT:
        b->ended = true;
        break;
    default: /* beginnings and ends that hold nothing */
        break;
    }
}

static void tell_syntax(struct builder *b)
{
    bh_syntax_say(&b->parser, b->cursor, b->depth ? b->frames[b->depth - 1].node->at : (bh_mark){0},
                  path_here(b, false), b->job->diags);
    b->wrong = b->ended = true;
}

static void run(struct builder *b)
{
    const unsigned char *bytes = (const unsigned char *)b->job->bytes;
    b->waiting = malloc(FIRST_ROOM * sizeof(bh_node *));
    b->room = FIRST_ROOM;
    if (!b->waiting || !yaml_parser_initialize(&b->parser)) {
        lose(b);
        return;
    }
    yaml_parser_set_input_string(&b->parser, bytes, b->job->length);
    while (!b->ended) {
        yaml_event_t event;
        if (!yaml_parser_parse(&b->parser, &event)) {
            tell_syntax(b);
        } else {
            take(b, &event);
            yaml_event_delete(&event);
        }
    }
    yaml_parser_delete(&b->parser);
}

bh_tree bh_tree_build(const bh_tree_job *job)
{
    const bh_cursor start = bh_cursor_start(job->bytes, job->length, job->name);
    struct builder b = {.job = job, .cursor = start};
    if (!bh_source_check(start, job->path, job->diags))
        return b.tree;
    run(&b);
    if (!b.wrong && bh_node_empty(b.tree.root)) {
        const bh_mark whole = {job->name, 1, 1};
        SAY(&b, whole, BH_SAY_EMPTY);
    }
    free(b.waiting);
    bh_text_free(&b.path);
    b.tree.root = b.wrong ? NULL : b.tree.root;
    return b.tree;
}
