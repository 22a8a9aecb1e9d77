/* cmd_keys.c - beamhours keys [KEY | columns]: what a plan can say, from the table that reads it,
 * and what a run table can show. */
#include <string.h>

#include "beamhours/command/input.h"
#include "beamhours/command/places.h"
#include "beamhours/plan/key_list.h"
#include "beamhours/report/text_table.h"
#include "beamhours/run/columns.h"

enum { KEY = 30 };

/* One line of the list: the key indented by depth, what it takes, what it is. */
static void brief(const bh_plan_key *key, bh_text *out)
{
    char lead[96];
    const char *last = strrchr(key->path, '.');
    const int indent = 2 * key->depth;
    (void)snprintf(lead, sizeof lead, "%*s%-*s %c ", indent, "", KEY - indent,
                   last ? last + 1 : key->path, key->required ? 'r' : ' ');
    bh_report_wrapped(lead, key->meaning, bh_places_width(), out);
}

static void field(const char *name, const char *text, bh_text *out)
{
    if (text && text[0])
        bh_report_wrapped(name, text, bh_places_width(), out);
}

static void full(const bh_plan_key *key, bh_text *out)
{
    const char *last = strrchr(key->path, '.');
    bh_text_appendf(out, "%s\n", key->path);
    field("  meaning   ", key->meaning, out);
    field("  takes     ", key->kind, out);
    field("  units     ", key->units, out);
    field("  required  ", key->required ? "yes" : "no", out);
    field("  one of    ", key->group, out);
    field("  default   ", key->preset, out);
    if (key->example && key->example[0])
        bh_text_appendf(out, "  example   %s: %s\n", last ? last + 1 : key->path, key->example);
    if (!key->built)
        field("  ", "read and checked, but no number depends on it yet", out);
}

static void inside(const char *path, bh_text *out)
{
    const size_t length = strlen(path);
    bh_plan_key key;
    bool any = false;
    for (size_t i = 0; bh_plan_key_at(i, &key); i++) {
        if (strncmp(key.path, path, length) != 0 || key.path[length] != '.')
            continue;
        if (!any)
            bh_text_append(out, "\nkeys inside (r: required)\n");
        any = true;
        brief(&key, out);
    }
}

static void all(bh_text *out)
{
    bh_plan_key key;
    bh_text_append(out,
                   "keys of a plan (r: required); `beamhours keys beam.current` says all of one\n");
    for (size_t i = 0; bh_plan_key_at(i, &key); i++)
        brief(&key, out);
}

/* What a run table can show: key, heading unit, meaning. */
static void columns(bh_text *out)
{
    bh_text_append(out, "columns of a run table, for --columns, --sort and --show\n");
    for (int id = 0; id < BH_COLUMN_COUNT; id++) {
        const bh_column *column = bh_column_at(id);
        char lead[96];
        (void)snprintf(lead, sizeof lead, "%-*s ", KEY, column->key);
        bh_report_wrapped(lead, column->meaning, bh_places_width(), out);
    }
}

/* American spellings of keys are accepted, as in plans. */
static void british(const char *word, char *out, size_t size)
{
    (void)snprintf(out, size, "%s", word);
    char *ize = strstr(out, "polarization");
    if (ize)
        ize[strlen("polari")] = 's';
}

/* The paths that end in this name alone: "in_plane" is "arms.in_plane".  Returns how many. */
static int places_of(const char *name, bh_text *places, bh_plan_key *found)
{
    bh_plan_key key;
    int count = 0;
    for (size_t i = 0; bh_plan_key_at(i, &key); i++) {
        const char *last = strrchr(key.path, '.');
        if (!last || strcmp(last + 1, name) != 0)
            continue;
        bh_text_appendf(places, "%s%s", count ? ", " : "", key.path);
        *found = key;
        count++;
    }
    return count;
}

static int no_key(const bh_arguments *a, const bh_text *places, const bh_plan_key *near)
{
    char sentence[400];
    if (places->bytes)
        (void)snprintf(sentence, sizeof sentence, "\"%.60s\" is a key in several places: %s",
                       a->words[0], places->bytes);
    else
        (void)snprintf(sentence, sizeof sentence, "no key \"%.60s\"%s%s%s", a->words[0],
                       near->path[0] ? "; did you mean " : "; `beamhours keys` lists them",
                       near->path, near->path[0] ? "?" : "");
    return bh_usage(a, sentence);
}

int bh_cmd_keys(const bh_arguments *arguments)
{
    bh_text out = {0};
    bh_plan_key key, near;
    if (arguments->word_count > 1)
        return bh_usage(arguments, "takes one key at most");
    if (arguments->word_count == 0) {
        all(&out);
        return bh_output(&out, NULL);
    }
    if (strcmp(arguments->words[0], "columns") == 0) {
        columns(&out);
        return bh_output(&out, NULL);
    }
    char word[80];
    british(arguments->words[0], word, sizeof word);
    if (!bh_plan_key_find(word, &key, &near)) {
        bh_text places = {0};
        const int found = places_of(word, &places, &key);
        const int status = found == 1 ? 0 : no_key(arguments, &places, &near);
        bh_text_free(&places);
        if (status)
            return status;
    }
    full(&key, &out);
    inside(key.path, &out);
    return bh_output(&out, NULL);
}
