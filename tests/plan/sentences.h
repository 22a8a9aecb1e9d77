/* sentences.h - which sentence of base/sentences.h a text is. */
#ifndef TESTS_PLAN_SENTENCES_H
#define TESTS_PLAN_SENTENCES_H

#include <regex.h>
#include <stdbool.h>
#include <stdio.h>
#include <string.h>

#include "../suite.h"
#include "beamhours/base/file.h"

#define FOLDER "tests/bad-plans"
enum { MOST_SENTENCES = 400 };

struct sentence {
    char name[60];
    regex_t pattern;
    size_t literal; /* characters that are the same each time */
    int times;
    const char *last; /* the file that provoked it last: a file counts once */
};

struct sentences {
    int count;
    struct sentence *list;
};

/* What one conversion of printf becomes; returns behind it. */
static inline const char *conversion(const char *fmt, char *out)
{
    if (fmt[1] == '%') {
        strcat(out, "%");
        return fmt + 2;
    }
    strcat(out, ".*");
    fmt += 1 + strspn(fmt + 1, "0123456789.lzh-+ #");
    return fmt + 1;
}

static inline void compile(const char *fmt, struct sentence *s)
{
    char pattern[2000] = "^";
    while (*fmt) {
        if (*fmt == '%') {
            fmt = conversion(fmt, pattern);
            continue;
        }
        const char one[] = {'\\', *fmt, '\0'};
        strcat(pattern, strchr(".[]{}()*+?^$|\\", *fmt) ? one : one + 1);
        s->literal++;
        fmt++;
    }
    strcat(pattern, "$");
    ck_assert_int_eq(regcomp(&s->pattern, pattern, REG_EXTENDED | REG_NOSUB), 0);
}

/* The string that a #define holds, pieces joined; ends with a line that does not continue. */
static inline void define_text(const char *at, char *out)
{
    bool inside = false;
    for (; *at && (inside || *at != '\n'); at++) {
        if (*at == '"') {
            inside = !inside;
        } else if (*at == '\\') {
            at++;
            if (inside)
                strncat(out, at, 1);
        } else if (inside) {
            strncat(out, at, 1);
        }
    }
}

static inline void read_sentences(struct sentences *all)
{
    bh_text text = {0};
    ck_assert_int_eq(bh_file_read("include/beamhours/base/sentences.h", 1 << 20, &text, NULL), 0);
    for (const char *line = text.bytes; line; line = strchr(line, '\n')) {
        char name[60], fmt[1000] = "";
        line += *line == '\n';
        if (sscanf(line, "#define %59[A-Z0-9_]", name) != 1 || strncmp(name, "BH_SAY_", 7) != 0)
            continue;
        ck_assert_int_lt(all->count, MOST_SENTENCES);
        struct sentence *s = &all->list[all->count++];
        snprintf(s->name, sizeof s->name, "%s", name);
        define_text(line + strcspn(line, "\"\n\\"), fmt);
        compile(fmt, s);
    }
    bh_text_free(&text);
}

/* The sentence with most of its own words in `text`. */
static inline void count_sentence(struct sentences *all, const char *text, const char *file)
{
    struct sentence *best = NULL;
    for (int i = 0; i < all->count; i++) {
        struct sentence *s = &all->list[i];
        if ((!best || s->literal > best->literal) && regexec(&s->pattern, text, 0, NULL, 0) == 0)
            best = s;
    }
    ck_assert_msg(best != NULL, "%s: not a sentence of base/sentences.h: %s", file, text);
    if (best->last != file)
        best->times++;
    best->last = file;
}

/* Sentences that no plan file of reasonable size can provoke. */
static inline bool is_elsewhere(const char *name, const bh_text *list)
{
    const size_t length = strlen(name);
    for (const char *at = list->bytes; at && (at = strstr(at, name)) != NULL; at++)
        if (at[length] == ' ')
            return true;
    return false;
}

#endif
