/* test_graft.c - one value is put in, or nothing is changed and the reason told. */
#include "../suite.h"

#include <string.h>

#include "beamhours/base/text.h"
#include "beamhours/document/node.h"

static const char plan[] = "beam: {current: 20 uA}\n"
                           "settings:\n"
                           "  - {name: K1, angle: 25 deg}\n"
                           "  - {name: '1', angle: 30 deg}\n"
                           "edges: [1, 2]\n";

static void flatten(bh_text *to, const bh_node *node)
{
    if (node->kind == BH_NODE_SCALAR) {
        bh_text_append(to, node->text);
        return;
    }
    bh_text_append(to, node->kind == BH_NODE_LIST ? "[" : "{");
    for (size_t i = 0; i < node->count; i++) {
        bh_text_append(to, i > 0 ? " " : "");
        if (node->keys)
            bh_text_appendf(to, "%s:", node->keys[i]->text);
        ck_assert_ptr_eq(node->items[i]->parent, node);
        flatten(to, node->items[i]);
    }
    bh_text_append(to, node->kind == BH_NODE_LIST ? "]" : "}");
}

static void demand_tree(const bh_document *document, const char *wanted)
{
    bh_text text = {0};
    flatten(&text, bh_document_root(document));
    ck_assert_str_eq(text.bytes, wanted);
    bh_text_free(&text);
}

#define UNCHANGED \
    "{beam:{current:20 uA} settings:[{name:K1 angle:25 deg} {name:1 angle:30 deg}] edges:[1 2]}"

static const struct {
    const char *path, *value, *wanted;
} good[] = {
    {"beam.current", "40 uA",
     "{beam:{current:40 uA} settings:[{name:K1 angle:25 deg} {name:1 angle:30 deg}] edges:[1 2]}"},
    {"beam.particle", " muon+ ",
     "{beam:{current:20 uA particle:muon+} settings:[{name:K1 angle:25 deg} "
     "{name:1 angle:30 deg}] edges:[1 2]}"},
    {"settings.K1.angle", "[1 deg, '2 deg']",
     "{beam:{current:20 uA} settings:[{name:K1 angle:[1 deg 2 deg]} {name:1 angle:30 deg}] "
     "edges:[1 2]}"},
    /* a name goes before a number */
    {"settings.1.angle", "{from: 1 deg}",
     "{beam:{current:20 uA} settings:[{name:K1 angle:25 deg} {name:1 angle:{from:1 deg}}] "
     "edges:[1 2]}"},
    {"settings.2.goal", "1 %",
     "{beam:{current:20 uA} settings:[{name:K1 angle:25 deg} {name:1 angle:30 deg goal:1 %}] "
     "edges:[1 2]}"},
    {"settings.2", "{name: K3}",
     "{beam:{current:20 uA} settings:[{name:K1 angle:25 deg} {name:K3}] edges:[1 2]}"},
    {"edges.2", "7",
     "{beam:{current:20 uA} settings:[{name:K1 angle:25 deg} {name:1 angle:30 deg}] edges:[1 7]}"},
    {"schedule.changes.energy", "8 h",
     "{beam:{current:20 uA} settings:[{name:K1 angle:25 deg} {name:1 angle:30 deg}] edges:[1 2] "
     "schedule:{changes:{energy:8 h}}}"},
    {"beam", "\"x # y\"",
     "{beam:x # y settings:[{name:K1 angle:25 deg} {name:1 angle:30 deg}] edges:[1 2]}"},
};

START_TEST(puts_in_one_value)
{
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(plan, sizeof plan - 1, "p.yaml", diags);
    char source[] = "--with 1";
    const bh_node *node = bh_document_graft(d, good[_i].path, good[_i].value, source, diags);
    source[0] = 'x';
    ck_assert_ptr_nonnull(node);
    ck_assert_uint_eq(bh_diags_count(diags), 0);
    demand_tree(d, good[_i].wanted);
    ck_assert_uint_eq(node->from + node->to, 0);
    ck_assert_str_eq(node->at.file, "--with 1");
    ck_assert_int_eq(node->at.line, 1);
    ck_assert_int_eq(node->at.column, (int)strlen(good[_i].path) + 2 + (good[_i].value[0] == ' '));
    bh_document_free(d);
    bh_diags_free(diags);
}
END_TEST

static const struct {
    const char *path, *value, *key, *begins;
    int column; /* in the text PATH=VALUE */
} bad[] = {
    {"", "1", "plan", "`` has an empty part", 1},
    {"beam.", "1", "plan", "`beam.` has an empty part", 6},
    {"beam..x", "1", "plan", "`beam..x` has an empty part", 6},
    {"settings.K9.angle", "1", "settings", "there is no `K9` in this list of 2; name one of K1, 1,",
     10},
    {"settings.3", "1", "settings", "there is no `3` in this list of 2", 10},
    {"settings.0", "1", "settings", "there is no `0` in this list of 2", 10},
    {"edges.3", "1", "edges", "there is no item `3` in this list; give a number from 1 to 2", 7},
    {"edges.99999999999999999999", "1", "edges", "there is no item `99999999999999999999`", 7},
    {"edges.x.y", "1", "edges", "there is no item `x`", 7},
    {"beam.current.x", "1", "beam.current", "`x` cannot be found inside the single value `20 uA`",
     14},
    {"beam.current", "", "beam.current", "no value is given for `beam.current`", 14},
    {"beam.current", " # 5", "beam.current", "no value is given", 14},
    {"beam.current", "0.8 # b", "beam.current", "`# b` goes beyond one value", 18},
    {"beam.current", "a: b", "beam.current", "`a: b` goes beyond", 14},
    {"beam.current", "- b", "beam.current", "`- b` goes beyond", 14},
    {"beam.current", "| b", "beam.current", "`b` cannot stand here", 16},
    {"beam.current", "1\n2", "beam.current", "`2` goes beyond", 16},
    {"beam.current", "1\n", "beam.current", "`1` goes beyond", 14},
    {"beam.current", "%YAML 1.1", "beam.current", "`%` cannot begin a value", 14},
    {"b\xC3\xA4m", "\xC2\xB5 # \xC2\xB5", "b\xC3\xA4m", "`# \xC2\xB5` goes beyond", 7},
    {"beam.current", "[1, 2", "beam.current", "`[` in line 1 is not closed", 19},
    {"beam.current", "'x' y", "beam.current", "`y` follows a value", 18},
    {"beam.spot", "{x: 1, x: 2}", "beam.spot", "`x` was already given", 18},
    {"beam.spot", "{x: {y: &a 2}}", "beam.spot.x", "`&a` names", 19},
    {"beam.current", "*a", "beam.current", "`*a` repeats", 14},
    {"beam.current", "\xFF", "beam.current", "the byte 0xFF", 14},
    {"a.b.c", "[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[1]]]]]]]]]]]]]]]]]]]]]]]]]]]]]]",
     "a.b.c.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1.1",
     "values are nested more than 32 deep", 36},
};

START_TEST(changes_nothing_and_says_why)
{
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(plan, sizeof plan - 1, "p.yaml", diags);
    ck_assert_ptr_null(bh_document_graft(d, bad[_i].path, bad[_i].value, "--with 2", diags));
    demand_tree(d, UNCHANGED);
    ck_assert_uint_eq(bh_diags_count(diags), 1);
    const bh_diag *said = bh_diags_at(diags, 0);
    ck_assert_msg(strncmp(said->text, bad[_i].begins, strlen(bad[_i].begins)) == 0, "said: %s",
                  said->text);
    ck_assert_str_eq(said->key, bad[_i].key);
    ck_assert_str_eq(said->at.file, "--with 2");
    ck_assert_int_eq(said->at.column, bad[_i].column);
    ck_assert_int_eq(said->at.line, 1);
    bh_document_free(d);
    bh_diags_free(diags);
}
END_TEST

START_TEST(long_lists_are_named_in_part)
{
    bh_text yaml = {0};
    bh_text_append(&yaml, "s:\n");
    for (int i = 1; i <= 20; i++)
        bh_text_appendf(&yaml, "- name: N%d\n", i);
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(yaml.bytes, yaml.length, "p.yaml", diags);
    ck_assert_ptr_null(bh_document_graft(d, "s.x", "1", "--with 1", diags));
    ck_assert_ptr_nonnull(strstr(bh_diags_at(diags, 0)->text, "N11, N12, ..., or give"));
    bh_document_free(d);
    bh_diags_free(diags);
    bh_text_free(&yaml);
}
END_TEST

START_TEST(grafts_upon_grafts_and_drops)
{
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(plan, sizeof plan - 1, "p.yaml", diags);
    ck_assert_ptr_nonnull(bh_document_graft(d, "beam.spot", "{x: 1, y: 2}", "--with 1", diags));
    ck_assert_ptr_nonnull(bh_document_graft(d, "beam.spot.y", "3", "--with 2", diags));
    const bh_node *root = bh_document_root(d), *beam = bh_node_get(root, "beam");
    bh_document_drop(d, beam, "current");
    bh_document_drop(d, beam, "absent");
    bh_document_drop(d, bh_node_get(root, "edges"), "1");
    bh_document_drop(d, NULL, "x");
    bh_document_drop(d, bh_node_get(bh_node_get(root, "beam"), "spot"), "x");
    bh_document_drop(d, root, "settings");
    demand_tree(d, "{beam:{spot:{y:3}} edges:[1 2]}");
    bh_document_drop(d, root, "edges");
    bh_document_drop(d, root, "beam");
    demand_tree(d, "{}");
    ck_assert_ptr_nonnull(bh_document_graft(d, "a", "1", "--with 1", diags));
    demand_tree(d, "{a:1}");
    bh_document_free(d);
    bh_diags_free(diags);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("graft");
    tcase_add_loop_test(tests, puts_in_one_value, 0, COUNT(good));
    tcase_add_loop_test(tests, changes_nothing_and_says_why, 0, COUNT(bad));
    tcase_add_test(tests, long_lists_are_named_in_part);
    tcase_add_test(tests, grafts_upon_grafts_and_drops);
    return run_suite("document/graft", tests);
}
