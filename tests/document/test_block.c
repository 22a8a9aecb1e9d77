/* test_block.c - texts under | and > gain, lose and change lines: the value is the one that was
 * given, every other line of the file stays byte for byte, and undo brings the old bytes back. */
#include "../suite.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "beamhours/document/edit.h"

static bh_edit *open_text(const char *text)
{
    bh_diags *diags = bh_diags_new();
    bh_edit *edit = bh_edit_open(text, strlen(text), "t.yaml", diags);
    ck_assert_msg(edit != NULL, "%s", bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "");
    bh_diags_free(diags);
    return edit;
}

static void set(bh_edit *edit, const char *path, const char *text)
{
    bh_diags *diags = bh_diags_new();
    const bool done = bh_edit_set(edit, path, text, diags);
    ck_assert_msg(done, "%s", bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "");
    bh_diags_free(diags);
}

static void is(const bh_edit *edit, const char *wanted)
{
    size_t length = 0;
    const char *bytes = bh_edit_bytes(edit, &length);
    ck_assert_str_eq(bytes, wanted);
    ck_assert_uint_eq(length, strlen(wanted));
}

static const struct {
    const char *before, *text, *after;
} rows[] = {
    /* under |, line by line */
    {"a: 1\nn: |\n  one\n  two\nb: 2 # c\n", "one\ntwo\nthree",
     "a: 1\nn: |\n  one\n  two\n  three\nb: 2 # c\n"},
    {"n: |\n  one\n  two\nb: 2\n", "one", "n: |\n  one\nb: 2\n"},
    {"n: |-\n    one\nb: 2\n", "one\n\n two", "n: |-\n    one\n\n     two\nb: 2\n"},
    {"n: |\r\n  one\r\nb: 2\r\n", "one\ntwo", "n: |\r\n  one\r\n  two\r\nb: 2\r\n"},
    {"n: |\n  one", "one\ntwo", "n: |\n  one\n  two"},
    /* under >, whose paragraphs were broken as the user liked */
    {"n: >\n  one\n  two\n  three\n\n  four\n  five\n\n  six\nb: 2\n", "one two three\nfour 5\nsix",
     "n: >\n  one\n  two\n  three\n\n  four 5\n\n  six\nb: 2\n"},
    {"n: >\n  one\n  two\n\n  four\n  five\nb: 2\n", "one two\nthree\nfour five",
     "n: >\n  one\n  two\n\n  three\n\n  four\n  five\nb: 2\n"},
    {"n: >\n  one\n  two\n\n  four\n  five\nb: 2\n", "one two\nfour five\nsix",
     "n: >\n  one\n  two\n\n  four\n  five\n\n  six\nb: 2\n"},
    {"n: >\n  one\n  two\n\n  four\n  five\n\n  six\n  x\nb: 2\n", "one two\nsix x",
     "n: >\n  one\n  two\n\n  six\n  x\nb: 2\n"},
    {"n: >\n  one\n  two\n\n  four\n  five\nb: 2\n", "four five", "n: >\n  four\n  five\nb: 2\n"},
    {"n: >\n  one\n  two\n\n  four\n  five\nb: 2\n", "one two", "n: >\n  one\n  two\nb: 2\n"},
    {"n: >\n  one\n  two\n\n  four\n  five\nb: 2\n", "one two\n\n\nfour five",
     "n: >\n  one\n  two\n\n\n\n  four\n  five\nb: 2\n"},
    {"n: >-\r\n  one\r\n  two\r\n\r\n  four\r\n  five\r\nb: 2\r\n", "one two\nfour",
     "n: >-\r\n  one\r\n  two\r\n\r\n  four\r\nb: 2\r\n"},
    /* the same again is no change, however it is broken */
    {"n: >\n  one\n  two\n\n  four\n  five\nb: 2\n", "one two\nfour five",
     "n: >\n  one\n  two\n\n  four\n  five\nb: 2\n"},
    {"n: |\n  one\n   \n  two\nb: 2\n", "one\n \ntwo", "n: |\n  one\n   \n  two\nb: 2\n"},
    /* indented further: written anew as a whole */
    {"n: >\n  one\n    two\n  three\nb: 2\n", "one", "n: >\n  one\nb: 2\n"},
};

START_TEST(lines_come_and_go)
{
    bh_edit *edit = open_text(rows[_i].before);
    bh_diags *diags = bh_diags_new();
    set(edit, "n", rows[_i].text);
    is(edit, rows[_i].after);
    if (strcmp(rows[_i].before, rows[_i].after) == 0)
        ck_assert_uint_eq(bh_edit_done(edit), 0);
    else
        ck_assert(bh_edit_undo(edit, diags));
    is(edit, rows[_i].before);
    bh_diags_free(diags);
    bh_edit_free(edit);
}
END_TEST

/* --- whatever the text --- */

enum { MOST = 8 };

static unsigned roll(unsigned *dice, unsigned sides)
{
    *dice = *dice * 1664525U + 1013904223U;
    return (*dice >> 16) % sides;
}

/* A paragraph: its value, and its lines as they stand in the file. */
struct paragraph {
    char value[200], lines[300];
};

static void make_paragraph(unsigned *dice, int number, bool folded, struct paragraph *out)
{
    snprintf(out->value, sizeof out->value, "p%d", number);
    snprintf(out->lines, sizeof out->lines, "   p%d", number);
    for (unsigned words = roll(dice, 6); words > 0; words--) {
        char word[16];
        snprintf(word, sizeof word, "w%u", roll(dice, 100000));
        snprintf(out->value + strlen(out->value), 20, " %s", word);
        snprintf(out->lines + strlen(out->lines), 20, "%s%s",
                 folded && roll(dice, 2) ? "\n   " : " ", word);
    }
}

static void join(const struct paragraph *p, int count, bool lines, const char *gap, bh_text *into)
{
    for (int i = 0; i < count; i++)
        bh_text_appendf(into, "%s%s", lines ? p[i].lines : p[i].value, i + 1 < count ? gap : "");
}

START_TEST(other_paragraphs_stay)
{
    for (unsigned seed = 1; seed <= 300; seed++) {
        unsigned dice = seed * 2654435761U;
        const bool folded = roll(&dice, 2);
        const char *const gap = folded ? "\n\n" : "\n";
        struct paragraph p[MOST + 1];
        int count = 1 + (int)roll(&dice, MOST - 1);
        for (int i = 0; i < count; i++)
            make_paragraph(&dice, i, folded, &p[i]);
        bh_text before = {0}, value = {0}, after = {0};
        bh_text_appendf(&before, "a: x # y\nn: %s\n", folded ? ">" : "|");
        join(p, count, true, gap, &before);
        bh_text_append(&before, "\n# below\nb: 2\n");
        const int at = (int)roll(&dice, (unsigned)count);
        const unsigned what = roll(&dice, count > 1 ? 3 : 2);
        if (what == 0) { /* another one in its place */
            snprintf(p[at].value, sizeof p[at].value, "new %u", seed);
            snprintf(p[at].lines, sizeof p[at].lines, "   new %u", seed);
        } else if (what == 1) { /* one more */
            memmove(p + at + 1, p + at, (size_t)(count++ - at) * sizeof *p);
            snprintf(p[at].value, sizeof p[at].value, "new %u", seed);
            snprintf(p[at].lines, sizeof p[at].lines, "   new %u", seed);
        } else { /* one less */
            memmove(p + at, p + at + 1, (size_t)(--count - at) * sizeof *p);
        }
        join(p, count, false, "\n", &value);
        bh_text_appendf(&after, "a: x # y\nn: %s\n", folded ? ">" : "|");
        join(p, count, true, gap, &after);
        bh_text_append(&after, "\n# below\nb: 2\n");
        bh_edit *edit = open_text(before.bytes);
        bh_diags *diags = bh_diags_new();
        set(edit, "n", value.bytes);
        is(edit, after.bytes);
        ck_assert(bh_edit_undo(edit, diags));
        is(edit, before.bytes);
        ck_assert(bh_edit_redo(edit, diags));
        is(edit, after.bytes);
        bh_diags_free(diags);
        bh_edit_free(edit);
        bh_text_free(&before);
        bh_text_free(&value);
        bh_text_free(&after);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("block");
    tcase_set_timeout(tests, 120);
    tcase_add_loop_test(tests, lines_come_and_go, 0, COUNT(rows));
    tcase_add_test(tests, other_paragraphs_stay);
    return run_suite("document/block", tests);
}
