/* test_document_faults.c - each request for memory fails once, and is told. */
#include "../suite.h"

#include <stdio.h>
#include <string.h>

#include "../faults.h"

#include "beamhours/document/node.h"

static const char *const texts[] = {
    /* good */
    ("plan: 1\nbeam: {current: 20 uA, spot: {x: 1 mm}}\nsettings:\n  - {name: K1, angle: 25 deg}\n "
     " "
     "- name: K2\n    angle: [1 deg, 2 deg]\nnotes: |\n  text\n\n  more\ntitle: \"a \\\"b\\\"\"\n"),
    /* with complaints of every kind that need memory of their own */
    "a: &x 1\nb: *x\nc: !!str 1\nd: {e: 1, e: 2}\nf: Run #3\n<<: 1\n--- \n",
    "a:\n  - b: {c: \"d\\q\"}\n",
    "%YAML 1.1\n%TAG !a! b\n---\na: [1, [2, {b: 3}\n",
};

static const char *const grafts[][2] = {
    {"settings.K1.angle", "{from: 20 deg, to: [1, 'x']}"},
    {"schedule.changes.energy", "8 h"},
    {"settings.K9.angle", "1"},
    {"beam.current", "1 # x"},
    {"beam.current", "1 &"},
};

struct outcome {
    bool read, grafted, lost; /* lost: a complaint about memory, the last one */
    size_t errors[2];         /* after reading, in the end */
};

/* Reads, and grafts where the text is good.  (Check itself asks for memory: no assertions here.) */
static struct outcome work(const char *text, const char *const *graft)
{
    struct outcome o = {.lost = true};
    bh_diags *diags = bh_diags_new();
    if (!diags)
        return o;
    bh_document *document = bh_document_parse(text, strlen(text), "p.yaml", diags);
    o.read = document != NULL;
    o.errors[0] = bh_diags_errors(diags);
    o.grafted = o.read && graft &&
                bh_document_graft(document, graft[0], graft[1], "--with 1", diags) != NULL;
    o.errors[1] = bh_diags_errors(diags);
    const size_t count = bh_diags_count(diags);
    o.lost = count > 0 && strcmp(bh_diags_at(diags, count - 1)->text, "out of memory") == 0;
    bh_document_free(document);
    bh_diags_free(diags);
    return o;
}

/* Lets one call fail; false when there are not so many. */
static bool fail_one(long call, const char *text, const char *const *graft)
{
    fail_at(call, false);
    const struct outcome o = work(text, graft);
    const bool hit = fault_hit;
    fail_at(0, false);
    ck_assert_msg(o.lost == hit, "call %ld failed unnoticed: %.200s", call, text);
    if (o.errors[1] > 0 || o.read) {
        ck_assert_int_eq(o.read, o.errors[0] == 0);
        ck_assert_int_eq(o.read && (o.grafted || !graft), o.errors[1] == 0);
    }
    return hit;
}

static void fail_each(const char *text, const char *const *graft)
{
    long call = 1;
    while (fail_one(call, text, graft))
        call++;
    ck_assert_int_gt(call, 10); /* or nothing was tried */
}

START_TEST(reading_tells)
{
    fail_each(texts[_i], NULL);
}
END_TEST

START_TEST(grafting_tells)
{
    fail_each(texts[0], grafts[_i]);
}
END_TEST

/* Every block of the arena in turn: long texts need more than one. */
START_TEST(long_documents_tell)
{
    static char text[300 * 1000];
    size_t n = 0;
    for (int i = 0; n < sizeof text - 64; i++)
        n += (size_t)snprintf(text + n, sizeof text - n, "key%d: [%d, {a: %d}]\n", i, i, i);
    for (long call = 1; fail_one(call, text, NULL); call += 1 + call / 8)
        ;
}
END_TEST

/* The arena asks for memory seldom; a comment of every length brings each of its pieces to the
 * end of a block once. */
START_TEST(each_piece_tells)
{
    static const char *const graft[] = {"schedule.tasks.first", "{name: x, time: [8 h, 9 h]}"};
    static char text[66 * 1024];
    for (size_t pad = 58 * 1024; pad < 65 * 1024; pad += 48) {
        (void)strcpy(text, "a: [1, {b: 2}]\nc: \"d\"\n#");
        memset(text + strlen(text), 'x', pad);
        (void)strcpy(text + pad, "\ne: f\n");
        fail_at(1000000, false);
        (void)work(text, graft);
        const long calls = fault_calls;
        fail_at(0, false);
        for (long call = calls - 4; call <= calls; call++)
            (void)fail_one(call, text, graft);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("document faults");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, reading_tells, 0, COUNT(texts));
    tcase_add_loop_test(tests, grafting_tells, 0, COUNT(grafts));
    tcase_add_test(tests, long_documents_tell);
    tcase_add_test(tests, each_piece_tells);
    return run_suite("document/faults", tests);
}
