/* schema.c - a mapping read by its table: known keys, missing keys, groups. */
#include "beamhours/schema/schema.h"

#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/sentences.h"
#include "beamhours/schema/reading.h"
#include "beamhours/schema/slips.h"

/* No table of the program is longer; bh_schema_read says so where one is. */
enum { MOST_KEYS = 64, MOST_GROUPS = 16 };

/* One mapping being read. */
struct job {
    const bh_reading *reading;
    const bh_schema *schema;
    const bh_node *node;
    unsigned char *out;
    const bh_node *key_node[MOST_KEYS]; /* the i-th key as written, or NULL */
    bool meant[MOST_KEYS];              /* what was written is unknown, but probably means it */
};

const bh_key *bh_schema_find(const bh_schema *schema, const char *name)
{
    const char *known = bh_british(name);
    for (size_t i = 0; i < schema->count; i++)
        if (strcmp(schema->keys[i].name, known) == 0)
            return &schema->keys[i];
    return NULL;
}

/* --- one key --- */

/* NOLINTBEGIN(misc-no-recursion): as deep as the tables of keys are, five levels */

/* The struct under a mapping key; `node` NULL: absent, or not readable. */
static bh_code read_part(const bh_reading *reading, const bh_key *key, const bh_node *node,
                         void *out)
{
    bh_reading inner = *reading;
    inner.partial = reading->partial || (key->flags & BH_KEY_OVERRIDE);
    return bh_schema_read(&inner, key->children, node, out);
}

static bh_code read_mapping(const bh_reading *reading, bh_written written, void *out)
{
    if (bh_read_is(reading, written, BH_NODE_MAPPING))
        return read_part(reading, written.key, written.node, out);
    bh_section *section = out;
    const bh_mark at = written.node->at;
    section->at = at;
    const bh_code code = read_part(reading, written.key, NULL, out);
    *section = (bh_section){.node = written.node, .at = at, .given = true};
    return code;
}

static bh_code read_member(const bh_reading *reading, bh_written written, void *member)
{
    switch (written.key->kind) {
    case BH_KEY_QUANTITY:
    case BH_KEY_NUMBER:
    case BH_KEY_COUNT:
        bh_read_value(reading, written, member);
        return BH_OK;
    case BH_KEY_EXTENT:
    case BH_KEY_RANGE:
        bh_read_extent(reading, written, member);
        return BH_OK;
    case BH_KEY_WORD:
    case BH_KEY_NAME:
    case BH_KEY_TEXT:
        bh_read_word(reading, written, member);
        return BH_OK;
    case BH_KEY_EITHER:
        bh_read_either(reading, written, member);
        return BH_OK;
    case BH_KEY_SWEEP:
        return bh_read_sweep(reading, written, member);
    case BH_KEY_TABLE:
        return bh_read_table(reading, written, member);
    case BH_KEY_VALUES:
        return bh_read_values(reading, written, member);
    case BH_KEY_WORDS:
        return bh_read_words(reading, written, member);
    case BH_KEY_MAPPING:
        return read_mapping(reading, written, member);
    case BH_KEY_LIST:
        break;
    }
    return bh_read_list(reading, written, member);
}

/* --- keys that are absent --- */

/* The default of a key that is a quantity or a word, if it is a word. */
static const char *word_of(const bh_key *key, const char *fallback)
{
    for (size_t i = 0; fallback && key->words && key->words[i]; i++)
        if (strcmp(key->words[i], fallback) == 0)
            return key->words[i];
    return NULL;
}

static void set_absent(const struct job *job, const bh_key *key, void *member)
{
    const bh_mark at = ((const bh_section *)(const void *)job->out)->at;
    const char *fallback = job->reading->partial ? NULL : key->fallback;
    bh_quantity q = {.value = 0.0};
    switch (key->kind) {
    case BH_KEY_QUANTITY:
    case BH_KEY_NUMBER:
    case BH_KEY_COUNT:
    case BH_KEY_EITHER: /* begins with a bh_value */
        bh_read_fallback(key, fallback, &q);
        *(bh_value *)member = (bh_value){.value = q.value, .uncertainty = q.uncertainty, .at = at};
        if (key->kind == BH_KEY_EITHER)
            ((bh_either *)member)->word = (bh_word){.text = word_of(key, fallback), .at = at};
        break;
    case BH_KEY_EXTENT:
    case BH_KEY_RANGE:
        ((bh_extent *)member)->at = at;
        break;
    case BH_KEY_WORD:
    case BH_KEY_NAME:
    case BH_KEY_TEXT:
        *(bh_word *)member = (bh_word){.text = fallback, .at = at};
        break;
    case BH_KEY_SWEEP:
        ((bh_sweep *)member)->at = at;
        break;
    case BH_KEY_TABLE:
        ((bh_pairs *)member)->at = at;
        ((bh_pairs *)member)->word = (bh_word){.text = fallback, .at = at};
        break;
    case BH_KEY_VALUES:
        ((bh_values *)member)->at = at;
        break;
    case BH_KEY_WORDS:
        ((bh_words *)member)->at = at;
        break;
    case BH_KEY_MAPPING:
        ((bh_section *)member)->at = at;
        break;
    case BH_KEY_LIST:
        ((bh_list *)member)->at = at;
        break;
    }
}

/* Given, so that nothing asks for it, but of no value: its key was misspelt. */
static void set_unreadable(const bh_key *key, void *member)
{
    switch (key->kind) {
    case BH_KEY_QUANTITY:
    case BH_KEY_NUMBER:
    case BH_KEY_COUNT:
    case BH_KEY_EITHER:
        ((bh_value *)member)->given = true;
        ((bh_value *)member)->value = NAN;
        break;
    case BH_KEY_EXTENT:
    case BH_KEY_RANGE:
        *(bh_extent *)member =
            (bh_extent){.from = NAN, .to = NAN, .given = true, .at = ((bh_extent *)member)->at};
        break;
    case BH_KEY_WORD:
    case BH_KEY_NAME:
    case BH_KEY_TEXT:
        ((bh_word *)member)->given = true;
        ((bh_word *)member)->text = NULL;
        break;
    case BH_KEY_SWEEP:
        ((bh_sweep *)member)->given = true;
        break;
    case BH_KEY_TABLE:
    case BH_KEY_VALUES:
    case BH_KEY_WORDS:
    case BH_KEY_MAPPING:
    case BH_KEY_LIST:
        break; /* as absent */
    }
}

static bh_code fill_absent(const struct job *job, size_t i)
{
    const bh_key *key = &job->schema->keys[i];
    void *member = job->out + key->offset;
    set_absent(job, key, member);
    if (job->meant[i])
        set_unreadable(key, member);
    else if (job->node && !job->reading->partial && (key->flags & BH_KEY_REQUIRED)) {
        const bh_section *section = (const void *)job->out;
        bh_say(job->reading, section->at, section, key->name, BH_SAY_MISSING_KEY, job->schema->name,
               key->name, key->example);
    }
    if (key->kind == BH_KEY_MAPPING)
        return read_part(job->reading, key, NULL, member);
    return BH_OK;
}

/* --- keys that nobody knows --- */

static void say_unknown(struct job *job, const bh_node *key_node)
{
    const char *names[MOST_KEYS + 1] = {NULL};
    for (size_t i = 0; i < job->schema->count; i++)
        names[i] = job->schema->keys[i].name;
    const char *near = bh_slip(key_node->text, names, job->schema->count);
    if (!near)
        near = bh_nearest(key_node->text, names, job->schema->count);
    const bh_section *section = (const void *)job->out;
    for (size_t i = 0; i < job->schema->count; i++)
        job->meant[i] = job->meant[i] || names[i] == near;
    if (near) {
        bh_say(job->reading, key_node->at, section, key_node->text, BH_SAY_UNKNOWN_KEY,
               job->schema->name, near);
        return;
    }
    char all[400];
    bh_say(job->reading, key_node->at, section, key_node->text, BH_SAY_UNKNOWN_KEY_OF,
           job->schema->name, bh_words_text(names, all, sizeof all));
}

/* --- groups --- */

static void say_missing_group(const struct job *job, int group)
{
    const char *names[MOST_KEYS + 1] = {NULL};
    size_t n = 0;
    for (size_t i = 0; i < job->schema->count; i++)
        if (job->schema->keys[i].group == group)
            names[n++] = job->schema->keys[i].name;
    const bh_section *section = (const void *)job->out;
    if (n == 0)
        return;
    char all[200];
    bh_say(job->reading, section->at, section, names[0], BH_SAY_MISSING_GROUP, job->schema->name,
           bh_words_text(names, all, sizeof all));
}

/* Before b in the document; places in the same file only. */
static bool earlier(bh_mark a, bh_mark b)
{
    return a.line < b.line || (a.line == b.line && a.column < b.column);
}

static void say_two(const struct job *job, const bh_node *a, const bh_node *b)
{
    const bool in_order = earlier(a->at, b->at);
    const bh_node *first = in_order ? a : b, *second = in_order ? b : a;
    bh_say(job->reading, second->at, (const void *)job->out, second->text, BH_SAY_TWO_OF_GROUP,
           first->text, second->text);
}

static void check_group(const struct job *job, int group)
{
    const bh_node *first = NULL;
    bool needed = job->node && !job->reading->partial && ((job->schema->exactly >> group) & 1U);
    for (size_t i = 0; i < job->schema->count; i++) {
        const bh_node *found = job->key_node[i];
        if (job->schema->keys[i].group != group)
            continue;
        if (first && found)
            say_two(job, first, found);
        first = first ? first : found;
        needed = needed && !found && !job->meant[i];
    }
    if (needed)
        say_missing_group(job, group);
}

/* --- the mapping --- */

static bh_code read_pair(struct job *job, size_t n)
{
    const bh_node *key_node = job->node->keys[n];
    const bh_key *key = bh_schema_find(job->schema, key_node->text);
    if (!key) {
        say_unknown(job, key_node);
        return BH_OK;
    }
    const size_t i = (size_t)(key - job->schema->keys);
    if (job->key_node[i]) { /* in both spellings */
        bh_say(job->reading, key_node->at, (const void *)job->out, key_node->text,
               BH_SAY_TWO_OF_GROUP, job->key_node[i]->text, key_node->text);
        return BH_OK;
    }
    job->key_node[i] = key_node;
    return read_member(job->reading, (bh_written){key, job->node->items[n]},
                       job->out + key->offset);
}

static bh_code read_all(struct job *job)
{
    bh_code code = BH_OK;
    for (size_t n = 0; job->node && n < job->node->count && !code; n++)
        code = read_pair(job, n);
    for (size_t i = 0; i < job->schema->count && !code; i++)
        if (!job->key_node[i])
            code = fill_absent(job, i);
    for (int group = 1; group < MOST_GROUPS && !code; group++)
        check_group(job, group);
    return code;
}

bh_code bh_schema_read(const bh_reading *reading, const bh_schema *schema, const bh_node *node,
                       void *out)
{
    char example[80];
    (void)snprintf(example, sizeof example, "%s: %s", schema->keys[0].name,
                   schema->keys[0].example);
    const bh_key anything = {.example = example};
    bh_section *section = out;
    const bh_mark at = node ? node->at : section->at;
    memset(out, 0, schema->size);
    *section = (bh_section){.node = node, .at = at, .given = node != NULL};
    if (node && node->kind != BH_NODE_MAPPING) {
        (void)bh_read_is(reading, (bh_written){&anything, node}, BH_NODE_MAPPING);
        node = NULL;
    }
    struct job job = {.reading = reading, .schema = schema, .node = node, .out = out};
    const bh_code code = schema->count <= MOST_KEYS ? read_all(&job) : BH_EDOMAIN;
    if (code == BH_ENOMEM)
        bh_diags_lose(reading->diags);
    return code;
}

/* NOLINTEND(misc-no-recursion) */
