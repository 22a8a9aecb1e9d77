/* test_node.c - documents become nodes that know their bytes and their place. */
#include "../suite.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/document/node.h"

/* --- what is read --- */

struct print {
    char *to;
    size_t size, length;
    const char *bytes;
};

static void add(struct print *p, const char *text, size_t length)
{
    ck_assert_uint_lt(p->length + length, p->size);
    memcpy(p->to + p->length, text, length);
    p->to[p->length += length] = '\0';
}

/* Flow style; a text stands between bars, followed by the bytes it spans. */
static void flatten(struct print *p, const bh_node *node)
{
    static const char *const marks[] = {"|", "[]", "{}"};
    add(p, marks[node->kind], 1);
    if (node->kind == BH_NODE_SCALAR) {
        add(p, node->text, node->length);
        add(p, "|", 1);
        add(p, p->bytes + node->from, node->to - node->from);
        return;
    }
    for (size_t i = 0; i < node->count; i++) {
        add(p, " ", i > 0);
        if (node->keys) {
            ck_assert_ptr_eq(node->keys[i]->parent, node);
            add(p, node->keys[i]->text, node->keys[i]->length);
            add(p, ":", 1);
        }
        ck_assert_ptr_eq(node->items[i]->parent, node);
        flatten(p, node->items[i]);
    }
    add(p, marks[node->kind] + 1, 1);
}

static const struct {
    const char *yaml, *wanted;
    size_t from, to; /* of the root */
} good[] = {
    {"a: 855 MeV   # c\nb: 'x # y'\n", "{a:|855 MeV|855 MeV b:|x # y|'x # y'}", 0, 27},
    {"\n# c\na:\n  - 1 # c\n  # d\n\nb: {c: \"q\\n\"}  # e\n", "{a:[|1|1] b:{c:|q\n|\"q\\n\"}}", 5,
     38},
    {"\xEF\xBB\xBF"
     "a: \xC2\xB1"
     "28 mrad\nb: \xC2\xB5m # c\n",
     "{a:|\xC2\xB1"
     "28 mrad|\xC2\xB1"
     "28 mrad b:|\xC2\xB5m|\xC2\xB5m}",
     3, 22},
    {"a: |\n  x\n\n  y\n\n# c\nb: >-\n  p\n  q\n",
     "{a:|x\n\ny\n||\n  x\n\n  y b:|p q|>-\n  p\n  q}", 0, 32},
    {"a: |\r\n  x\r\n  y\r\nb: 'p\r\n  q'\r\nc: z # c\r\n",
     "{a:|x\ny\n||\r\n  x\r\n  y b:|p q|'p\r\n  q' c:|z|z}", 0, 33},
    {"a:\nb:   # c\nc: ''\n", "{a:|| b:|| c:||''}", 0, 17},
    {"- [1, [2]]\n-\n- - x\n  - y: z\n", "[[|1|1 [|2|2]] || [|x|x {y:|z|z}]]", 0, 27},
    {"a:\n- x\n- y\nb: 1\n", "{a:[|x|x |y|y] b:|1|1}", 0, 15},
    {"---\na: 1\n...\n", "{a:|1|1}", 4, 8},
    {"? a\n: b\n", "{a:|b|b}", 0, 7},
    {"word", "|word|word", 0, 4},
    {"[]", "[]", 0, 2},
    {"{}", "{}", 0, 2},
    {"a: long\n  text\n", "{a:|long text|long\n  text}", 0, 14},
    {"no: yes\nx: ~\n", "{no:|yes|yes x:|~|~}", 0, 12},
    {"a: 5 %\nb: it's\nc: K1+a\n", "{a:|5 %|5 % b:|it's|it's c:|K1+a|K1+a}", 0, 22},
};

START_TEST(reads_with_spans)
{
    char text[500];
    struct print p = {text, sizeof text, 0, NULL};
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(good[_i].yaml, strlen(good[_i].yaml), "p.yaml", diags);
    ck_assert_uint_eq(bh_diags_count(diags), 0);
    ck_assert_ptr_nonnull(d);
    size_t length = 0;
    p.bytes = bh_document_bytes(d, &length);
    ck_assert_uint_eq(length, strlen(good[_i].yaml));
    ck_assert_str_eq(bh_document_name(d), "p.yaml");
    const bh_node *root = bh_document_root(d);
    flatten(&p, root);
    ck_assert_str_eq(text, good[_i].wanted);
    ck_assert_uint_eq(root->from, good[_i].from);
    ck_assert_uint_eq(root->to, good[_i].to);
    bh_document_free(d);
    bh_diags_free(diags);
}
END_TEST

START_TEST(marks_count_code_points)
{
    static const char yaml[] = "\xEF\xBB\xBF"
                               "a\xC2\xB5: {b: [\xE2\x88\x92"
                               "1, x]}\n\xF0\x9D\x94\x9Ex: |\n  y\n";
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(yaml, sizeof yaml - 1, "p.yaml", diags);
    ck_assert_ptr_nonnull(d);
    const bh_node *root = bh_document_root(d);
    ck_assert_int_eq(root->style, BH_STYLE_BLOCK);
    const bh_node *list = bh_node_get(bh_node_get(root, "a\xC2\xB5"), "b");
    ck_assert_int_eq(list->style, BH_STYLE_FLOW);
    ck_assert_int_eq(list->at.column, 9);
    ck_assert_int_eq(list->items[1]->at.line, 1);
    ck_assert_int_eq(list->items[1]->at.column, 14);
    ck_assert_int_eq(root->items[1]->at.line, 2);
    ck_assert_int_eq(root->items[1]->at.column, 5);
    ck_assert_int_eq(root->items[1]->style, BH_STYLE_BLOCK);
    ck_assert_str_eq(root->at.file, "p.yaml");
    ck_assert_ptr_null(bh_node_get(root, "b"));
    ck_assert_ptr_null(bh_node_get(list, "b"));
    ck_assert_ptr_null(bh_node_get(NULL, "b"));
    bh_document_free(d);
    bh_diags_free(diags);
}
END_TEST

/* A document of `count` times `piece` between two texts; free it. */
static char *repeated(const char *before, const char *piece, size_t count, const char *after)
{
    char *text = malloc(strlen(before) + count * strlen(piece) + strlen(after) + 1);
    ck_assert_ptr_nonnull(text);
    char *end = stpcpy(text, before);
    for (size_t i = 0; i < count; i++)
        end = stpcpy(end, piece);
    (void)stpcpy(end, after);
    return text;
}

static void demand_errors(const char *text, size_t length, size_t wanted, const char *begins)
{
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(text, length, "p.yaml", diags);
    ck_assert_int_eq(d == NULL, wanted > 0);
    ck_assert_uint_eq(bh_diags_errors(diags), wanted);
    if (wanted)
        ck_assert_int_eq(strncmp(bh_diags_at(diags, 0)->text, begins, strlen(begins)), 0);
    bh_document_free(d);
    bh_diags_free(diags);
}

START_TEST(nesting_ends_at_32)
{
    static const struct {
        const char *before, *piece;
        size_t count;
        const char *after, *begins;
    } rows[] = {
        {"", "[", 32, "]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]", NULL},
        {"", "[", 33, "", "values are nested more than 32 deep"},
        {"", "- ", 32, "x", NULL},
        {"", "- ", 33, "x", "values are nested more than 32 deep"},
        {"a: ", "{a: ", 32, "", "values are nested more than 32 deep"},
        {"", "[", 40000, "", "values are nested more than 32 deep"},
        {"", "- ", 500000, "", "values are nested more than 32 deep"},
    };
    for (int i = 0; i < COUNT(rows); i++) {
        char *text = repeated(rows[i].before, rows[i].piece, rows[i].count, rows[i].after);
        demand_errors(text, strlen(text), rows[i].begins != NULL, rows[i].begins);
        free(text);
    }
}
END_TEST

START_TEST(one_mebibyte_and_no_more)
{
    char *text = repeated("a: 1\n", "#", BH_DOCUMENT_LIMIT, "");
    demand_errors(text, BH_DOCUMENT_LIMIT, 0, NULL);
    demand_errors(text, BH_DOCUMENT_LIMIT + 1, 1, "the file is longer than 1 MiB");
    free(text);
}
END_TEST

/* What would take hours if places or equal keys were looked for from the beginning each time. */
START_TEST(a_full_document_takes_no_longer_than_its_length)
{
    char *line = repeated("[", "a, ", 349000, "]");
    demand_errors(line, strlen(line), 0, NULL);
    free(line);
    char *keys = malloc(BH_DOCUMENT_LIMIT);
    ck_assert_ptr_nonnull(keys);
    size_t n = 0;
    for (int i = 0; n < BH_DOCUMENT_LIMIT - 32; i++)
        n += (size_t)sprintf(keys + n, "k%d:\n", i);
    demand_errors(keys, n, 0, NULL);
    free(keys);
    char *equal = repeated("", "a:\n", 340000, "");
    demand_errors(equal, strlen(equal), 339999, "`a` was already given in line 1");
    free(equal);
}
END_TEST

START_TEST(keeps_its_own_copies)
{
    char yaml[] = "a: b\n", name[] = "p.yaml";
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(yaml, sizeof yaml - 1, name, diags);
    memset(yaml, 'x', sizeof yaml - 1);
    name[0] = 'q';
    size_t length = 0;
    ck_assert_str_eq(bh_document_bytes(d, &length), "a: b\n");
    ck_assert_str_eq(bh_document_name(d), "p.yaml");
    ck_assert_str_eq(bh_document_root(d)->at.file, "p.yaml");
    bh_document_free(d);
    bh_document_free(NULL);
    bh_diags_free(diags);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("node");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, reads_with_spans, 0, COUNT(good));
    tcase_add_test(tests, marks_count_code_points);
    tcase_add_test(tests, nesting_ends_at_32);
    tcase_add_test(tests, one_mebibyte_and_no_more);
    tcase_add_test(tests, a_full_document_takes_no_longer_than_its_length);
    tcase_add_test(tests, keeps_its_own_copies);
    return run_suite("document/node", tests);
}
