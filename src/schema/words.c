/* words.c - spellings, lists of words for messages, and words chosen from a list. */
#include <ctype.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/sentences.h"
#include "beamhours/schema/reading.h"

enum { MOST_WORDS = 32 }; /* of a list in a message */

const char *bh_british(const char *word)
{
    static const char *const pair[][2] = {
        {"polarization", "polarisation"},       {"non-paralyzable", "non-paralysable"},
        {"non_paralyzable", "non-paralysable"}, {"nonparalyzable", "non-paralysable"},
        {"paralyzable", "paralysable"},
    };
    for (size_t i = 0; i < sizeof pair / sizeof pair[0]; i++)
        if (strcmp(word, pair[i][0]) == 0)
            return pair[i][1];
    return word;
}

const char *bh_words_text(const char *const *words, char *out, size_t size)
{
    size_t used = 0;
    out[0] = '\0';
    for (size_t i = 0; words[i] && used < size; i++) {
        const char *link = i == 0 ? "" : words[i + 1] ? ", " : " or ";
        const int more = snprintf(out + used, size - used, "%s%s", link, words[i]);
        used += more > 0 ? (size_t)more : 0;
    }
    return out;
}

static size_t word_count(const char *const *words)
{
    size_t n = 0;
    while (words[n])
        n++;
    return n;
}

int bh_schema_choice(const char *text, const char *const *words)
{
    for (int i = 0; text && words[i]; i++)
        if (strcmp(text, words[i]) == 0)
            return i;
    return 0;
}

/* "once, energy or a time in h or d": what would do. */
static const char *all_of(const bh_key *key, char *out, size_t size)
{
    static const char *const form[] = {
#define FORM_OF(id, name, unit, examples) [id] = name " in " examples,
        BH_DIMENSIONS(FORM_OF)
#undef FORM_OF
    };
    const char *all[MOST_WORDS + 2] = {NULL};
    size_t n = 0;
    while (n < MOST_WORDS && key->words[n]) {
        all[n] = key->words[n];
        n++;
    }
    if (key->kind == BH_KEY_EITHER)
        all[n] = form[key->dimension];
    return bh_words_text(all, out, size);
}

/* The word of the list, or NULL after a complaint. */
static const char *pick(const bh_reading *reading, bh_written written)
{
    const char *text = bh_british(written.node->text);
    const char *const *words = written.key->words;
    for (size_t i = 0; words[i]; i++)
        if (strcmp(text, words[i]) == 0)
            return words[i];
    const char *near = bh_nearest(text, words, word_count(words));
    if (near) {
        bh_say_node(reading, written.node, BH_SAY_UNKNOWN_WORD, written.node->text, near);
        return NULL;
    }
    char all[300];
    bh_say_node(reading, written.node, BH_SAY_UNKNOWN_WORD_OF, written.node->text,
                all_of(written.key, all, sizeof all));
    return NULL;
}

static bool is_name(const char *text)
{
    for (const unsigned char *c = (const unsigned char *)text; *c; c++)
        if (*c >= 0x80 || !(isalnum(*c) || strchr("_-+", *c)))
            return false;
    return text[0] != '\0';
}

void bh_read_word(const bh_reading *reading, bh_written written, bh_word *out)
{
    *out = (bh_word){.given = true, .at = written.node->at};
    if (!bh_read_is(reading, written, BH_NODE_SCALAR))
        return;
    if (written.key->kind == BH_KEY_NAME && !is_name(written.node->text))
        bh_say_node(reading, written.node, BH_SAY_NO_NAME, written.node->text);
    else if (written.key->words)
        out->text = pick(reading, written);
    else
        out->text = written.node->text;
}

void bh_read_either(const bh_reading *reading, bh_written written, bh_either *out)
{
    *out = (bh_either){.value = {.at = written.node->at}, .word = {.at = written.node->at}};
    if (!bh_read_is(reading, written, BH_NODE_SCALAR)) {
        out->word.given = true;
        return;
    }
    const unsigned char first = (unsigned char)written.node->text[0];
    if (isdigit(first) || first >= 0x80 || strchr("+-.(", first))
        bh_read_value(reading, written, &out->value);
    else
        bh_read_word(reading, written, &out->word);
}

BH_CHECKED bh_code bh_read_words(const bh_reading *reading, bh_written written, bh_words *out)
{
    *out = (bh_words){.given = true, .at = written.node->at};
    if (!bh_read_is(reading, written, BH_NODE_LIST))
        return BH_OK;
    const size_t n = written.node->count;
    bh_word *items = bh_arena_take(reading->arena, n + 1, sizeof *items);
    if (!items)
        return BH_ENOMEM;
    for (size_t i = 0; i < n; i++)
        bh_read_word(reading, (bh_written){written.key, written.node->items[i]}, &items[i]);
    out->items = items;
    out->count = n;
    return BH_OK;
}
