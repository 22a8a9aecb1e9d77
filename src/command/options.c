/* options.c - GNU-style options from one list: --name VALUE, --name=VALUE, -x VALUE, -xVALUE, --.
 */
#include "beamhours/command/options.h"
#include "beamhours/command/complain.h"

#include <string.h>
#include <sys/stat.h>
#include <sysexits.h>

#include "beamhours/base/nearest.h"

struct option {
    char letter;
    const char *name, *argument, *commands, *values, *meaning;
};

static const struct option options[] = {
#define ROW(id, letter, name, argument, commands, values, meaning) \
    {letter, name, argument, commands, values, meaning},
    BH_OPTIONS(ROW)
#undef ROW
};

static const struct {
    const char *name, *behind, *summary;
} commands[] = {
#define ROW(id, name, behind, summary, run) {name, behind, summary},
    BH_COMMANDS(ROW)
#undef ROW
};

const char *bh_command_name(bh_command_id id)
{
    return commands[id].name;
}

int bh_command_find(const char *name)
{
    for (int i = 0; i < BH_COMMAND_COUNT; i++)
        if (strcmp(commands[i].name, name) == 0)
            return i;
    return -1;
}

const char *bh_command_suggest(const char *name)
{
    const char *names[BH_COMMAND_COUNT];
    for (int i = 0; i < BH_COMMAND_COUNT; i++)
        names[i] = commands[i].name;
    return bh_nearest(name, names, BH_COMMAND_COUNT);
}

/* Whether `word` (of `length`) is one of the words in a list with commas. */
static bool listed(const char *list, const char *word, size_t length)
{
    while (*list) {
        const size_t n = strcspn(list, ",");
        if (n == length && strncmp(list, word, n) == 0)
            return true;
        list += n + (list[n] == ',');
    }
    return false;
}

static bool knows(bh_command_id command, int option)
{
    const char *name = commands[command].name;
    return listed(options[option].commands, name, strlen(name));
}

static int find_long(bh_command_id command, const char *name, size_t length)
{
    for (int i = 0; i < BH_OPTION_COUNT; i++)
        if (knows(command, i) && strlen(options[i].name) == length &&
            strncmp(options[i].name, name, length) == 0)
            return i;
    return -1;
}

static int find_short(bh_command_id command, char letter)
{
    for (int i = 0; i < BH_OPTION_COUNT; i++)
        if (options[i].letter == letter && knows(command, i))
            return i;
    return -1;
}

static int see_help(const char *command)
{
    bh_print(stderr, "beamhours: try: beamhours %s --help\n", command);
    return EX_USAGE;
}

int bh_usage(const bh_arguments *arguments, const char *sentence)
{
    const char *command = commands[arguments->command].name;
    bh_print(stderr, "beamhours: %s: %s\n", command, sentence);
    return see_help(command);
}

int bh_usage_option(const bh_arguments *arguments, bh_option_id id, const char *sentence)
{
    const char *command = commands[arguments->command].name;
    bh_print(stderr, "beamhours: %s: --%s: %s\n", command, options[id].name, sentence);
    return see_help(command);
}

static int unknown(bh_command_id command, const char *word)
{
    const char *names[BH_OPTION_COUNT];
    size_t n = 0;
    for (int i = 0; i < BH_OPTION_COUNT; i++)
        if (knows(command, i))
            names[n++] = options[i].name;
    char bare[40];
    (void)snprintf(bare, sizeof bare, "%.*s", (int)strcspn(word + 1, "="), word + 1);
    const char *near = bh_nearest(bare + strspn(bare, "-"), names, n);
    bh_print(stderr, "beamhours: %s: no option %s%s%s%s\n", commands[command].name, word,
             near ? "; did you mean --" : "", near ? near : "", near ? "?" : "");
    return see_help(commands[command].name);
}

/* Where reading stands. */
struct reader {
    int argc, next;
    char **argv;
    bh_arguments *out;
};

static int store(struct reader *r, int id, const char *value)
{
    bh_arguments *out = r->out;
    if (id == BH_OPT_WITH) {
        if (out->with_count == BH_MOST_CHANGES)
            return bh_usage(out, "more than 64 --with: write the changes into the plan");
        if (!strchr(value, '='))
            return bh_usage(out, "--with needs KEY=VALUE, such as --with 'beam.current=40 uA'");
        out->with[out->with_count++] = value;
    } else if (out->value[id] && strcmp(out->value[id], value) != 0) {
        return bh_usage_option(out, (bh_option_id)id, "given twice, with two values");
    }
    out->value[id] = value;
    return 0;
}

/* `attached` is the value behind = or behind the letter, or NULL. */
static int take(struct reader *r, int id, const char *attached)
{
    const struct option *o = &options[id];
    char sentence[200];
    if (o->argument[0] == '\0') {
        if (!attached)
            return store(r, id, "");
        (void)snprintf(sentence, sizeof sentence, "--%s takes no value", o->name);
        return bh_usage(r->out, sentence);
    }
    if (attached)
        return store(r, id, attached);
    if (r->next < r->argc)
        return store(r, id, r->argv[r->next++]);
    (void)snprintf(sentence, sizeof sentence, "--%s needs a value: --%s %s", o->name, o->name,
                   o->argument);
    return bh_usage(r->out, sentence);
}

static int one_option(struct reader *r, const char *word)
{
    const bh_command_id command = r->out->command;
    if (word[1] == '-') {
        const size_t length = strcspn(word + 2, "=");
        const int id = find_long(command, word + 2, length);
        const char *equals = word[2 + length] == '=' ? word + 3 + length : NULL;
        return id < 0 ? unknown(command, word) : take(r, id, equals);
    }
    const int id = find_short(command, word[1]);
    return id < 0 ? unknown(command, word) : take(r, id, word[2] ? word + 2 : NULL);
}

static bool same_file(const char *one, const char *other)
{
    struct stat a, b;
    return one && other && stat(one, &a) == 0 && stat(other, &b) == 0 && S_ISREG(a.st_mode) &&
           a.st_dev == b.st_dev && a.st_ino == b.st_ino;
}

/* What is read must not be written over, under whatever name. */
static int check_output(const bh_arguments *out)
{
    const char *path = out->value[BH_OPT_OUTPUT];
    for (int i = 0; i < out->word_count; i++)
        if (same_file(path, out->words[i]))
            return bh_usage_option(out, BH_OPT_OUTPUT,
                                   "this is the plan itself, which would be lost; name another "
                                   "file");
    if (same_file(path, out->value[BH_OPT_DATA]))
        return bh_usage_option(out, BH_OPT_OUTPUT,
                               "these are the data themselves, which would be lost; name another "
                               "file");
    return 0;
}

static int read_words(struct reader *r)
{
    bool only_words = false;
    bh_arguments *out = r->out;
    while (r->next < r->argc) {
        char *word = r->argv[r->next++];
        if (!only_words && strcmp(word, "--") == 0) {
            only_words = true;
            continue;
        }
        if (only_words || word[0] != '-' || word[1] == '\0') {
            out->words[out->word_count++] = word;
            continue;
        }
        const int bad = one_option(r, word);
        if (bad)
            return bad;
    }
    return 0;
}

int bh_arguments_read(bh_command_id command, int argc, char **argv, bh_arguments *out)
{
    *out = (bh_arguments){.command = command, .words = argv};
    struct reader r = {argc, 0, argv, out};
    const int bad = read_words(&r);
    return bad ? bad : check_output(out);
}

/* "text, csv or json" from "text,csv,json". */
static void in_words(const char *list, char *out, size_t size)
{
    size_t used = 0;
    while (*list && used + 1 < size) {
        const size_t n = strcspn(list, ",");
        const bool last = list[n] == '\0';
        used += (size_t)snprintf(out + used, size - used, "%s%.*s",
                                 used ? last ? " or " : ", " : "", (int)n, list);
        list += n + !last;
    }
}

const char *bh_arguments_format(const bh_arguments *arguments, bh_option_id id)
{
    const char *given = arguments->value[id];
    char choices[80] = "", sentence[200];
    if (!given)
        return "text";
    if (listed(options[id].values, given, strlen(given)) && given[0])
        return given;
    in_words(options[id].values, choices, sizeof choices);
    (void)snprintf(sentence, sizeof sentence, "no format \"%.60s\"; --format is %s", given,
                   choices);
    (void)bh_usage(arguments, sentence);
    return NULL;
}

void bh_options_help(FILE *to)
{
    fputs("usage: beamhours COMMAND ...\n", to);
    for (int i = 0; i < BH_COMMAND_COUNT; i++)
        fprintf(to, "  %-10s %-13s %s\n", commands[i].name, commands[i].behind,
                commands[i].summary);
    fputs("beamhours COMMAND --help shows its options, beamhours help COMMAND the manual.\n", to);
}

void bh_options_help_command(bh_command_id command, FILE *to)
{
    fprintf(to, "usage: beamhours %s %s%s[option]...\n%s\n", commands[command].name,
            commands[command].behind, commands[command].behind[0] ? " " : "",
            commands[command].summary);
    for (int i = 0; i < BH_OPTION_COUNT; i++) {
        if (!knows(command, i))
            continue;
        char left[48], letter[8] = "    ";
        if (options[i].letter)
            (void)snprintf(letter, sizeof letter, "-%c, ", options[i].letter);
        (void)snprintf(left, sizeof left, "%s--%s %s", letter, options[i].name,
                       options[i].argument);
        fprintf(to, "  %-26s %s\n", left, options[i].meaning);
    }
}
