/* test_bad_plans.c - every plan of tests/bad-plans ends in exactly the errors that it wants.
 *
 * A file begins with comments, one for each error, in file order:
 *     # wants LINE:COLUMN KEY: words that the message must hold
 * An error in another file or in a change for one run says so:
 *     # wants materials/no-parts.yaml:3:1 KEY: words
 *     # wants --with 1:1:1 KEY: words
 *     # with beam.current=40 uA
 * The sentences of base/sentences.h must all be provoked, none by more than MOST_TIMES files;
 * tests/bad-plans/elsewhere.txt names those that other tests provoke, and why.
 */
#include "sentences.h"

#include <dirent.h>
#include <stdbool.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/plan/plan.h"

enum { MOST_FILES = 2000, MOST_WANTS = 60, MOST_TIMES = 20, MOST_CHANGES = 8 };

/* --- files --- */

static int by_text(const void *a, const void *b)
{
    return strcmp(*(char *const *)a, *(char *const *)b);
}

static int list_files(char **names)
{
    DIR *folder = opendir(FOLDER);
    int n = 0;
    ck_assert_msg(folder != NULL, "run from the top folder: no %s", FOLDER);
    for (const struct dirent *e; (e = readdir(folder)) != NULL;) {
        const size_t length = strlen(e->d_name);
        if (length > 5 && strcmp(e->d_name + length - 5, ".yaml") == 0 && n < MOST_FILES)
            names[n++] = strdup(e->d_name);
    }
    closedir(folder);
    qsort(names, (size_t)n, sizeof *names, by_text);
    return n;
}

/* --- what a file wants --- */

struct want {
    char file[128]; /* empty: the plan itself */
    int line, column;
    char key[160];
    char words[300];
};

struct wants {
    int count, change_count;
    struct want want[MOST_WANTS];
    bh_change changes[MOST_CHANGES];
    char change_text[MOST_CHANGES][300];
};

static void parse_want(const char *text, struct want *w)
{
    /* Only the place "--with 1:..." has a blank in it. */
    const char *blank = strchr(text + (strncmp(text, "--with ", 7) == 0 ? 7 : 0), ' ');
    ck_assert_msg(blank != NULL, "a want needs a place and a key: %s", text);
    char where[160];
    snprintf(where, sizeof where, "%.*s", (int)(blank - text), text);
    char *column = strrchr(where, ':');
    ck_assert_msg(column != NULL, "a want needs LINE:COLUMN: %s", text);
    *column++ = '\0';
    char *line = strrchr(where, ':');
    if (line) {
        *line++ = '\0';
        snprintf(w->file, sizeof w->file, "%.127s", where);
    } else {
        line = where;
    }
    w->line = atoi(line);
    w->column = atoi(column);
    const char *colon = strstr(blank + 1, ": ");
    ck_assert_msg(colon != NULL, "a want needs KEY: words: %s", text);
    snprintf(w->key, sizeof w->key, "%.*s", (int)(colon - blank - 1), blank + 1);
    snprintf(w->words, sizeof w->words, "%s", colon + 2);
}

static void parse_change(const char *text, struct wants *wants)
{
    ck_assert_int_lt(wants->change_count, MOST_CHANGES);
    char *copy = wants->change_text[wants->change_count];
    snprintf(copy, sizeof wants->change_text[0], "%.299s", text);
    char *equals = strchr(copy, '=');
    ck_assert_msg(equals != NULL, "# with PATH=VALUE: %s", text);
    *equals = '\0';
    wants->changes[wants->change_count++] = (bh_change){copy, equals + 1};
}

static void parse_wants(const char *bytes, struct wants *wants)
{
    while (bytes && bytes[0] == '#') {
        char line[600];
        snprintf(line, sizeof line, "%.*s", (int)strcspn(bytes, "\r\n"), bytes);
        if (strncmp(line, "# wants ", 8) == 0) {
            ck_assert_int_lt(wants->count, MOST_WANTS);
            parse_want(line + 8, &wants->want[wants->count++]);
        } else if (strncmp(line, "# with ", 7) == 0) {
            parse_change(line + 7, wants);
        }
        bytes = strchr(bytes, '\n');
        bytes = bytes ? bytes + 1 : NULL;
    }
}

/* --- one file --- */

static bool fits(const struct want *w, const bh_diag *d, const char *name)
{
    const char *file = w->file[0] ? w->file : name;
    const char *in = d->at.file ? d->at.file : "";
    const size_t want = strlen(file), got = strlen(in);
    return got >= want && strcmp(in + got - want, file) == 0 && w->line == d->at.line &&
           w->column == d->at.column && strcmp(w->key, d->key) == 0 &&
           strstr(d->text, w->words) != NULL;
}

static void print_said(const bh_diags *diags, const char *name)
{
    printf("%s says:\n", name);
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        const bool own = d->at.file && strcmp(d->at.file, name) == 0;
        if (d->severity == BH_SEVERITY_ERROR)
            printf("# wants %s%s%d:%d %s: %s\n", own || !d->at.file ? "" : d->at.file,
                   own ? "" : ":", d->at.line, d->at.column, d->key, d->text);
    }
}

static int compare(const struct wants *wants, const bh_diags *diags, const char *name)
{
    int seen = 0, bad = 0;
    for (size_t i = 0; i < bh_diags_count(diags); i++) {
        const bh_diag *d = bh_diags_at(diags, i);
        if (d->severity != BH_SEVERITY_ERROR)
            continue;
        bad += seen >= wants->count || !fits(&wants->want[seen], d, name);
        seen++;
    }
    bad += seen != wants->count || seen == 0;
    if (bad)
        print_said(diags, name);
    return bad > 0;
}

static int try_file(const char *name, struct sentences *all)
{
    static const char *const folders[] = {FOLDER, "materials", NULL};
    char path[300];
    bh_text text = {0};
    struct wants *wants = calloc(1, sizeof *wants);
    snprintf(path, sizeof path, FOLDER "/%s", name);
    ck_assert_int_eq(bh_file_read(path, 2 << 20, &text, NULL), 0);
    parse_wants(text.bytes, wants);
    bh_material_library *library = bh_material_library_new(folders);
    bh_diags *diags = bh_diags_new();
    bh_plan *plan = bh_plan_read(text.bytes, text.length, name, wants->changes,
                                 (size_t)wants->change_count, library, diags);
    int bad = compare(wants, diags, name);
    if (plan != NULL) {
        printf("%s: gave a plan\n", name);
        bad++;
    }
    for (size_t i = 0; i < bh_diags_count(diags); i++)
        if (bh_diags_at(diags, i)->severity == BH_SEVERITY_ERROR)
            count_sentence(all, bh_diags_at(diags, i)->text, name);
    bh_plan_free(plan);
    bh_diags_free(diags);
    bh_material_library_free(library);
    bh_text_free(&text);
    free(wants);
    return bad;
}

static int count_wrong(const struct sentences *all)
{
    bh_text elsewhere = {0};
    int wrong = 0;
    ck_assert_int_eq(bh_file_read(FOLDER "/elsewhere.txt", 1 << 20, &elsewhere, NULL), 0);
    for (int i = 0; i < all->count; i++) {
        const struct sentence *s = &all->list[i];
        const bool other = is_elsewhere(s->name, &elsewhere);
        if (s->times > MOST_TIMES || (s->times == 0) != other) {
            printf("%s: provoked by %d files%s\n", s->name, s->times,
                   other ? ", but listed in elsewhere.txt" : "");
            wrong++;
        }
    }
    bh_text_free(&elsewhere);
    return wrong;
}

START_TEST(every_bad_plan_says_what_is_wrong)
{
    char **names = calloc(MOST_FILES, sizeof *names);
    struct sentences all = {0, calloc(MOST_SENTENCES, sizeof *all.list)};
    int bad = 0;
    const int n = list_files(names);
    ck_assert_int_gt(n, 0);
    read_sentences(&all);
    ck_assert_int_gt(all.count, 100);
    for (int i = 0; i < n; i++)
        bad += try_file(names[i], &all);
    const int wrong = count_wrong(&all);
    fflush(stdout);
    ck_assert_msg(bad == 0, "%d of %d files say something else", bad, n);
    ck_assert_msg(wrong == 0, "%d sentences are provoked by no file, or by too many", wrong);
    for (int i = 0; i < n; i++)
        free(names[i]);
    for (int i = 0; i < all.count; i++)
        regfree(&all.list[i].pattern);
    free(all.list);
    free(names);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("bad plans");
    tcase_set_timeout(tests, 120);
    tcase_add_test(tests, every_bad_plan_says_what_is_wrong);
    return run_suite("bad plans", tests);
}
