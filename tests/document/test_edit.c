/* test_edit.c - a document changed: the bytes that change, and those that do not. */
#include "../suite.h"

#include <stdio.h>
#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/document/edit.h"
#include "beamhours/document/trail.h"

/* One change, the text before and after it (NULL: refused) and what the step is called, or how the
 * refusal begins. */
static const struct {
    bh_edit_change change;
    const char *before, *after, *said;
} rows[] = {
    /* scalars keep their form */
    {{BH_EDIT_SET, "beam.current", "30 uA", 0, NULL},
     "beam:\n  current:   20 uA   # mean\n",
     "beam:\n  current:   30 uA   # mean\n",
     "beam.current: 20 uA -> 30 uA"},
    {{BH_EDIT_SET, "a", " 30 uA ", 0, NULL}, "a: 1\n", "a: 30 uA\n", "a: 1 -> 30 uA"},
    {{BH_EDIT_SET, "a", "say \"b\" \\", 0, NULL},
     "a: \"x\"  # c\n",
     "a: \"say \\\"b\\\" \\\\\"  # c\n",
     "a: x -> say \"b\" \\"},
    {{BH_EDIT_SET, "a", "it's", 0, NULL}, "a: 'x'\n", "a: 'it''s'\n", "a: x -> it's"},
    {{BH_EDIT_SET, "a", "two\nlines", 0, NULL}, "a: 'x'\n", "a: \"two\\nlines\"\n", "a: x -> two"},
    {{BH_EDIT_SET, "a", " b ", 0, NULL}, "a: 'x'\n", "a: ' b '\n", "a: x ->  b"},
    {{BH_EDIT_SET, "a", "[b]", 0, NULL}, "a: 'x'\n", "a: '[b]'\n", "a: x -> [b]"},
    {{BH_EDIT_SET, "a", "Run #3", 0, NULL}, "a: x\n", "a: \"Run #3\"\n", "a: x -> Run #3"},
    {{BH_EDIT_SET, "a", "b: c", 0, NULL}, "a: x\n", "a: \"b: c\"\n", "a: x -> b: c"},
    {{BH_EDIT_SET, "a", "b\\\"c: ", 0, NULL}, "a: x\n", "a: 'b\\\"c:'\n", NULL},
    {{BH_EDIT_SET, "a", "", 0, NULL}, "a: x\n", "a: \"\"\n", NULL},
    {{BH_EDIT_SET, "a", "b, c", 0, NULL}, "a: x\n", "a: b, c\n", NULL},
    {{BH_EDIT_SET, "a.b", "b, c", 0, NULL}, "a: {b: x}\n", "a: {b: \"b, c\"}\n", NULL},
    {{BH_EDIT_SET, "a", "±28 mrad", 0, NULL},
     "a: ±3 mrad  # é\n",
     "a: ±28 mrad  # é\n",
     "a: ±3 mrad -> ±28 mrad"},
    {{BH_EDIT_SET, "a", "-28 mrad", 0, NULL}, "a: 1", "a: -28 mrad", NULL},
    {{BH_EDIT_SET, "a", "- 28", 0, NULL}, "a: 1", "a: \"- 28\"", NULL},
    {{BH_EDIT_SET, "a", "one", 0, NULL},
     "a: several\n  words\nb: 1\n",
     "a: one\nb: 1\n",
     "a: several words -> one"},
    {{BH_EDIT_SET, "a", "one", 0, NULL},
     "a: \"several\n  words\"\nb: 1\n",
     "a: \"one\"\nb: 1\n",
     NULL},
    {{BH_EDIT_SET, "b.2", "3", 0, NULL}, "b: [1,2 ,  4]\n", "b: [1,3 ,  4]\n", "b.2: 2 -> 3"},
    {{BH_EDIT_SET, "b", "3", 0, NULL},
     "\xEF\xBB\xBF"
     "a: 1\r\nb: 2\r\nc: |\r\n  x\r\n",
     "\xEF\xBB\xBF"
     "a: 1\r\nb: 3\r\nc: |\r\n  x\r\n",
     NULL},
    {{BH_EDIT_SET, "\"q\"", "3", 0, NULL}, "\"q\": 1\n", "\"q\": 1\n'\"q\"': 3\n", NULL},
    {{BH_EDIT_SET, "a", "x\x01", 0, NULL}, "a: 1\n", NULL, "the character U+0001 cannot be seen"},
    {{BH_EDIT_SET, "a", "x\xE9", 0, NULL}, "a: 1\n", NULL, "the character U+00E9 cannot be seen"},
    {{BH_EDIT_SET, "a", "x\xC2\x85", 0, NULL},
     "a: 1\n",
     NULL,
     "the character U+0085 cannot be seen"},
    /* brackets and quotes as they stand */
    {{BH_EDIT_SET, "angle", "{from: 20 deg, to: 60 deg, step: 5 deg}", 0, NULL},
     "angle: 20 deg # c\n",
     "angle: {from: 20 deg, to: 60 deg, step: 5 deg} # c\n",
     "angle: 20 deg -> {from: 20 deg, to: 60 deg, s..."},
    {{BH_EDIT_SET, "angle", "20 deg", 0, NULL},
     "angle: [20 deg, 30 deg]\n",
     "angle: 20 deg\n",
     "angle: [20 deg, 30 deg] -> 20 deg"},
    {{BH_EDIT_SET, "angle", "[20 deg", 0, NULL}, "angle: 20 deg\n", "angle: \"[20 deg\"\n", NULL},
    {{BH_EDIT_SET, "angle", "[1] # c", 0, NULL}, "angle: 20 deg\n", "angle: \"[1] # c\"\n", NULL},
    {{BH_EDIT_SET, "a", "\"b: c\"", 0, NULL}, "a: x\n", "a: \"b: c\"\n", NULL},
    {{BH_EDIT_SET, "a", "'b", 0, NULL}, "a: x\n", "a: \"'b\"\n", NULL},
    {{BH_EDIT_SET, "angle", "20 deg", 0, NULL},
     "angle:\n  from: 1\n  to: 2\nb: 1\n",
     "angle: 20 deg\nb: 1\n",
     NULL},
    {{BH_EDIT_SET, "angle", "20 deg", 0, NULL},
     "angle:\n  from: 1 # c\n  to: 2\nb: 1\n",
     NULL,
     "`angle` has parts and comments"},
    {{BH_EDIT_SET, "a.1", "20 deg", 0, NULL},
     "a:\n- b: 1\n  c: 2\n- d\n",
     "a:\n- 20 deg\n- d\n",
     NULL},
    /* nothing there yet */
    {{BH_EDIT_SET, "a", "1", 0, NULL}, "a:\nb: 1\n", "a: 1\nb: 1\n", NULL},
    {{BH_EDIT_SET, "a", "1", 0, NULL}, "a:   # c\nb: 1\n", "a: 1   # c\nb: 1\n", NULL},
    {{BH_EDIT_SET, "a.1", "1", 0, NULL}, "a:\n  -\n  - 2\n", "a:\n  - 1\n  - 2\n", NULL},
    {{BH_EDIT_SET, "a.b", "1", 0, NULL}, "a: {b: , c}\n", "a: {b: 1 , c}\n", NULL},
    {{BH_EDIT_SET, "a.c", "1", 0, NULL}, "a: {b: 0, c}\n", "a: {b: 0, c: 1}\n", NULL},
    {{BH_EDIT_SET, "a.x.y", "1 cm", 0, NULL}, "a:\nb: 1\n", "a: {x: {y: 1 cm}}\nb: 1\n", NULL},
    /* | and > */
    {{BH_EDIT_SET, "n", "one\n\nthree\n", 0, NULL},
     "n: |  # c\n    old\n     text\n\nb: 1\n",
     "n: |  # c\n    one\n\n    three\n\nb: 1\n",
     NULL},
    {{BH_EDIT_SET, "n", "one\n\n", 0, NULL}, "n: |-\n  old\nb: 1\n", "n: |-\n  one\nb: 1\n", NULL},
    {{BH_EDIT_SET, "n", "one\n\n", 0, NULL},
     "n: |+\n  old\n\n\n\nb: 1\n",
     "n: |+\n  one\n\nb: 1\n",
     NULL},
    {{BH_EDIT_SET, "n", "one\ntwo", 0, NULL},
     "n: >\n  old\n  text\nb: 1\n",
     "n: >\n  one\n\n  two\nb: 1\n",
     NULL},
    {{BH_EDIT_SET, "n",
      "words that are so many that they cannot stand on one line of sixty bytes and are folded", 0,
      NULL},
     "n: >-\n  old\nb: 1\n",
     "n: >-\n  words that are so many that they cannot stand on one line of\n  sixty bytes and are "
     "folded\nb: 1\n",
     NULL},
    {{BH_EDIT_SET, "n", "one", 0, NULL}, "n: |\n  old", "n: |\n  one", NULL},
    {{BH_EDIT_SET, "n", "one\ntwo", 0, NULL},
     "n: |\r\n  old\r\nb: 1\r\n",
     "n: |\r\n  one\r\n  two\r\nb: 1\r\n",
     NULL},
    {{BH_EDIT_SET, "n", "one", 0, NULL}, "n: |\nb: 1\n", "n: |\n  one\nb: 1\n", NULL},
    {{BH_EDIT_SET, "n", "", 0, NULL}, "n: |\n  old\nb: 1\n", "n: |\nb: 1\n", NULL},
    {{BH_EDIT_SET, "n", " one", 0, NULL},
     "n: |\n  old\nb: 1\n",
     NULL,
     "a text under | or > cannot begin with blanks"},
    {{BH_EDIT_SET, "n", " one", 0, NULL}, "n: |2\n   old\nb: 1\n", "n: |2\n   one\nb: 1\n", NULL},
    {{BH_EDIT_SET, "n", "a\n b", 0, NULL},
     "n: >\n  old\nb: 1\n",
     NULL,
     "a text under | or > cannot begin with blanks"},
    {{BH_EDIT_SET, "l.1.n", "x\ny\n", 0, NULL},
     "l:\n  - n: |\n      old\n    m: 1\n",
     "l:\n  - n: |\n      x\n      y\n    m: 1\n",
     NULL},
    /* new keys */
    {{BH_EDIT_SET, "beam.spot", "{x: 1 mm}", 0, NULL},
     "beam:\n  current: 1 uA # c\n    # more\n\nb: 1\n",
     "beam:\n  current: 1 uA # c\n    # more\n  spot: {x: 1 mm}\n\nb: 1\n",
     "beam.spot: {x: 1 mm} added"},
    {{BH_EDIT_SET, "beam.spot.x", "1 mm", 0, NULL},
     "beam: {current: 1 uA}\n",
     "beam: {current: 1 uA, spot: {x: 1 mm}}\n",
     NULL},
    {{BH_EDIT_SET, "beam.spot", "1 mm", 1, NULL},
     "beam: {current: 1 uA}\n",
     "beam: {spot: 1 mm, current: 1 uA}\n",
     NULL},
    {{BH_EDIT_SET, "beam.spot", "1 mm", 0, NULL}, "beam: {}\n", "beam: {spot: 1 mm}\n", NULL},
    {{BH_EDIT_SET, "b", "1", 0, NULL}, "a: 1", "a: 1\nb: 1", "b: 1 added"},
    {{BH_EDIT_SET, "b", "1", 1, NULL}, "a: 1", "b: 1\na: 1", NULL},
    {{BH_EDIT_SET, "b", "1", 3, NULL}, "a: 1", NULL, "there is no place 3 among 2"},
    {{BH_EDIT_SET, "l.1.b", "1", 1, NULL},
     "l:\n  - a: 1\n    c: 2\n",
     "l:\n  - b: 1\n    a: 1\n    c: 2\n",
     NULL},
    {{BH_EDIT_SET, "l.1.b", "1", 0, NULL}, "l:\n  - a: 1\n", "l:\n  - a: 1\n    b: 1\n", NULL},
    {{BH_EDIT_SET, "a.b", "1", 0, NULL}, "a: x\n", NULL, "`b` cannot be found inside"},
    {{BH_EDIT_SET, "a.4", "1", 0, NULL}, "a: [1, 2]\n", NULL, "there is no item `4` in this list"},
    {{BH_EDIT_SET, "a..b", "1", 0, NULL}, "a: [1, 2]\n", NULL, "`a..b` has an empty part"},
    {{BH_EDIT_SET, "", "1", 0, NULL}, "a: [1, 2]\n", NULL, "the whole file cannot be changed"},
    {{BH_EDIT_INSERT, "a", "b: 2", 0, NULL},
     "a:\n  c: 1\n",
     "a:\n  c: 1\n  b: 2\n",
     "a.b: 2 added"},
    {{BH_EDIT_INSERT, "a", "b 2", 0, NULL}, "a:\n  c: 1\n", NULL, "`b 2` has no colon"},
    {{BH_EDIT_INSERT, "a", "c: 2", 0, NULL}, "a:\n  c: 1\n", NULL, "there is a `c` here already"},
    {{BH_EDIT_INSERT, "a.c", "c: 2", 0, NULL}, "a:\n  c: 1\n", NULL, "`a.c` holds a single value"},
    {{BH_EDIT_INSERT, "z", "c: 2", 0, NULL}, "a:\n  c: 1\n", NULL, "there is no `z` to change"},
    /* new items */
    {{BH_EDIT_INSERT, "l", "{name: K3}", 0, NULL},
     "l:\n  - {name: K1}\n  - {name: K2}\n\nb: 1\n",
     "l:\n  - {name: K1}\n  - {name: K2}\n  - {name: K3}\n\nb: 1\n",
     "l.K3: {name: K3} added"},
    {{BH_EDIT_INSERT, "l", "x", 1, NULL},
     "l:\n  # about a\n  - a\n",
     "l:\n  - x\n  # about a\n  - a\n",
     NULL},
    {{BH_EDIT_INSERT, "l", "x", 2, NULL}, "l:\n- a\n\n- b\n", "l:\n- a\n\n- x\n\n- b\n", NULL},
    {{BH_EDIT_INSERT, "l", "x", 1, NULL},
     "l:\n  - - a\n    - b\n",
     "l:\n  - x\n  - - a\n    - b\n",
     NULL},
    {{BH_EDIT_INSERT, "l.1", "x", 1, NULL},
     "l:\n  - - a\n    - b\n",
     "l:\n  - - x\n    - a\n    - b\n",
     NULL},
    {{BH_EDIT_INSERT, "l", "x", 0, NULL}, "l: [a, b]\n", "l: [a, b, x]\n", NULL},
    {{BH_EDIT_INSERT, "l", "x", 0, NULL}, "l: [a, b,]\n", "l: [a, b, x,]\n", NULL},
    {{BH_EDIT_INSERT, "l", "x", 2, NULL}, "l: [a, b]\n", "l: [a, x, b]\n", NULL},
    {{BH_EDIT_INSERT, "l", "x", 0, NULL}, "l: []\n", "l: [x]\n", NULL},
    {{BH_EDIT_INSERT, "l", "x", 0, NULL},
     "l: [\n  a, # one\n  b  # two\n]\n",
     "l: [\n  a, # one\n  b,  # two\n  x\n]\n",
     NULL},
    {{BH_EDIT_INSERT, "l", "x", 2, NULL},
     "l: [\n  a, # one\n  b  # two\n]\n",
     "l: [\n  a, # one\n  x,\n  b  # two\n]\n",
     NULL},
    {{BH_EDIT_INSERT, "l", "x", 4, NULL}, "l: [a, b]\n", NULL, "there is no place 4 among 3"},
    /* keys renamed */
    {{BH_EDIT_RENAME, "beam.kinetic_energy", "momentum", 0, NULL},
     "beam:\n  kinetic_energy: 1 GeV # c\n",
     "beam:\n  momentum: 1 GeV # c\n",
     "beam.kinetic_energy -> momentum"},
    {{BH_EDIT_RENAME, "a", "b c", 0, NULL}, "\"a\": 1\n", "\"b c\": 1\n", NULL},
    {{BH_EDIT_RENAME, "a", "b", 0, NULL}, "a: 1\nb: 2\n", NULL, "there is a `b` here already"},
    {{BH_EDIT_RENAME, "a", "", 0, NULL}, "a: 1\nb: 2\n", NULL, "a key in `plan` needs a name"},
    {{BH_EDIT_RENAME, "a.1", "b", 0, NULL}, "a: [1]\nb: 2\n", NULL, "`a.1` is an item of a list"},
    /* duplicates */
    {{BH_EDIT_DUPLICATE, "s.K1", "K1b", 0, NULL},
     "s:\n  # first\n  - {name: K1, angle: 1 deg} # tail\n  - {name: K2}\n",
     "s:\n  # first\n  - {name: K1, angle: 1 deg} # tail\n  # first\n  - {name: K1b, angle: 1 deg} "
     "# tail\n  - {name: K2}\n",
     "s.K1 again as K1b"},
    {{BH_EDIT_DUPLICATE, "s.K1", "K2", 0, NULL},
     "s:\n  - name: K1\n    angle: 1 deg",
     "s:\n  - name: K1\n    angle: 1 deg\n  - name: K2\n    angle: 1 deg",
     NULL},
    {{BH_EDIT_DUPLICATE, "s.1", "K2", 0, NULL},
     "s:\n  - angle: 1 deg\n",
     "s:\n  - angle: 1 deg\n  - name: K2\n    angle: 1 deg\n",
     NULL},
    {{BH_EDIT_DUPLICATE, "s.1", NULL, 0, NULL}, "s: [1, 2]\n", "s: [1, 1, 2]\n", "s.1 again"},
    {{BH_EDIT_DUPLICATE, "s.1", "7", 0, NULL}, "s: [1, 2]\n", "s: [1, 7, 2]\n", NULL},
    {{BH_EDIT_DUPLICATE, "s.2", NULL, 0, NULL},
     "s: [\n  1, # a\n  2  # b\n]\n",
     "s: [\n  1, # a\n  2,  # b\n  2  # b\n]\n",
     NULL},
    {{BH_EDIT_DUPLICATE, "a", "b", 0, NULL},
     "a:\n  x: 1 # c\n  y: 2\n",
     "a:\n  x: 1 # c\n  y: 2\nb:\n  x: 1 # c\n  y: 2\n",
     "a again"},
    {{BH_EDIT_DUPLICATE, "a", "a", 0, NULL}, "a:\n  x: 1\n", NULL, "there is a `a` here already"},
    {{BH_EDIT_DUPLICATE, "a", NULL, 0, NULL}, "a:\n  x: 1\n", NULL, "a key in `plan` needs a name"},
    /* taken away */
    {{BH_EDIT_REMOVE, "s.K2", NULL, 0, NULL},
     "s:\n  - name: K1\n  # on 2\n  - name: K2 # tail\n    # deep\n  # on 3\n  - name: K3\n",
     "s:\n  - name: K1\n  # on 3\n  - name: K3\n",
     "s.K2 removed"},
    {{BH_EDIT_REMOVE, "b", NULL, 0, NULL},
     "a: 1\n\n# on b\nb: 1\n\nc: 1\n",
     "a: 1\n\nc: 1\n",
     NULL},
    {{BH_EDIT_REMOVE, "b", NULL, 0, NULL}, "a: 1\nb: 1", "a: 1", NULL},
    {{BH_EDIT_REMOVE, "b", NULL, 0, NULL}, "a: 1\r\nb: 1", "a: 1", NULL},
    {{BH_EDIT_REMOVE, "a", NULL, 0, NULL},
     "# of the file\na: 1 # of a\nb: 1",
     "# of the file\nb: 1",
     NULL},
    {{BH_EDIT_REMOVE, "s.1.name", NULL, 0, NULL},
     "s:\n  - name: K1\n    angle: 1\n",
     "s:\n  - angle: 1\n",
     NULL},
    {{BH_EDIT_REMOVE, "s.1", NULL, 0, NULL}, "s: # c\n  - a\nb: 1\n", "s: [] # c\nb: 1\n", NULL},
    {{BH_EDIT_REMOVE, "s.x", NULL, 0, NULL}, "s:\n  x: 1\nb: 1\n", "s: {}\nb: 1\n", NULL},
    {{BH_EDIT_REMOVE, "s.1.x", NULL, 0, NULL}, "s:\n  - x: 1\nb: 1\n", "s:\n  - {}\nb: 1\n", NULL},
    {{BH_EDIT_REMOVE, "a", NULL, 0, NULL}, "a: 1\n", NULL, "`a` is all there is in the file"},
    {{BH_EDIT_REMOVE, "s.a", NULL, 0, NULL}, "s: {a: 1, b: 2}\n", "s: {b: 2}\n", NULL},
    {{BH_EDIT_REMOVE, "s.b", NULL, 0, NULL}, "s: {a: 1, b: 2}\n", "s: {a: 1}\n", NULL},
    {{BH_EDIT_REMOVE, "s.a", NULL, 0, NULL}, "s: {a: 1}\n", "s: {}\n", NULL},
    {{BH_EDIT_REMOVE, "s.2", NULL, 0, NULL},
     "s: [\n  1, # a\n  2  # b\n]\n",
     "s: [\n  1, # a\n]\n",
     NULL},
    {{BH_EDIT_REMOVE, "s.1", NULL, 0, NULL},
     "s: [1, # a\n  2]\n",
     NULL,
     "`s.1` is laid out in a way"},
    {{BH_EDIT_REMOVE, "s.9", NULL, 0, NULL}, "s: [1]\n", NULL, "there is no item `9`"},
    {{BH_EDIT_REMOVE, "t", NULL, 0, NULL}, "s: [1]\n", NULL, "there is no `t` to change"},
    /* moved */
    {{BH_EDIT_MOVE, "s.K3", NULL, 1, NULL},
     "s:\n  # on 1\n  - K1\n\n  - K2 # tail\n  # on 3\n  - name: K3\n    angle: 1 deg\n",
     "s:\n  # on 3\n  - name: K3\n    angle: 1 deg\n\n  # on 1\n  - K1\n  - K2 # tail\n",
     "s.K3 moved from 3 to 1"},
    {{BH_EDIT_MOVE, "s.1", NULL, 0, NULL}, "s: [1, 2, 3]\n", "s: [2, 3, 1]\n", NULL},
    {{BH_EDIT_MOVE, "s.1", NULL, 2, NULL},
     "s: [\n  1, # a\n  2  # b\n]\n",
     "s: [\n  2,  # b\n  1 # a\n]\n",
     NULL},
    {{BH_EDIT_MOVE, "s.1.name", NULL, 2, NULL},
     "s:\n  - name: K1\n    angle: 1",
     "s:\n  - angle: 1\n    name: K1",
     NULL},
    {{BH_EDIT_MOVE, "s.1", NULL, 1, NULL}, "s: [1]\n", NULL, "there is nothing else beside `s.1`"},
    {{BH_EDIT_MOVE, "s.1", NULL, 3, NULL}, "s: [1, 2]\n", NULL, "there is no place 3 among 2"},
    {{BH_EDIT_MOVE, "s.1", NULL, 2, NULL},
     "s: [1, 2, # c\n 3]\n",
     NULL,
     "the change would have changed something else"},
    {{BH_EDIT_MOVE, "n", NULL, 2, NULL},
     "n: |+\n  x\n\nb: 1\n",
     NULL,
     "the change would have changed something else"},
};

static bh_edit *open_text(const char *text)
{
    bh_diags *diags = bh_diags_new();
    bh_edit *edit = bh_edit_open(text, strlen(text), "p.yaml", diags);
    ck_assert_msg(edit != NULL, "not read: %s", text);
    bh_diags_free(diags);
    return edit;
}

static void expect_bytes(const bh_edit *edit, const char *want, const char *of)
{
    size_t length = 0;
    const char *bytes = bh_edit_bytes(edit, &length);
    ck_assert_msg(length == strlen(want) && memcmp(bytes, want, length) == 0,
                  "%s\n--- wanted\n%s\n--- got\n%s", of, want, bytes);
}

START_TEST(a_change)
{
    const char *before = rows[_i].before, *after = rows[_i].after, *said = rows[_i].said;
    bh_edit *edit = open_text(before);
    bh_diags *diags = bh_diags_new();
    const bool done = bh_edit_apply(edit, &rows[_i].change, 1, diags);
    const char *why = bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "";
    ck_assert_msg(done == (after != NULL), "row %d: %s\n%s", _i, before, why);
    ck_assert_uint_eq(bh_diags_count(diags), done ? 0 : 1);
    expect_bytes(edit, after ? after : before, before);
    if (done) {
        ck_assert_uint_eq(bh_edit_steps(edit), 1);
        if (said)
            ck_assert_str_eq(bh_edit_step_at(edit, 0)->text, said);
        ck_assert_uint_eq(bh_edit_unsaved(edit), 1);
        ck_assert(bh_edit_undo(edit, diags));
        expect_bytes(edit, before, "undone");
        ck_assert_uint_eq(bh_edit_unsaved(edit), 0);
        ck_assert(bh_edit_redo(edit, diags));
        expect_bytes(edit, after, "redone");
    } else {
        ck_assert_msg(strncmp(why, said, strlen(said)) == 0, "%s\nnot %s", why, said);
        ck_assert_uint_eq(bh_edit_steps(edit), 0);
    }
    bh_diags_free(diags);
    bh_edit_free(edit);
}
END_TEST

static bool set(bh_edit *edit, const char *path, const char *text)
{
    bh_diags *diags = bh_diags_new();
    const bool done = bh_edit_set(edit, path, text, diags);
    bh_diags_free(diags);
    return done;
}

static void undo(bh_edit *edit, int times)
{
    bh_diags *diags = bh_diags_new();
    for (; times > 0; times--)
        ck_assert(bh_edit_undo(edit, diags));
    for (; times < 0; times++)
        ck_assert(bh_edit_redo(edit, diags));
    bh_diags_free(diags);
}

/* A plan with 200 lines of comment, saved after three changes, differs in exactly three values. */
START_TEST(three_changes_among_comments)
{
    bh_text text = {0}, wanted = {0};
    for (int round = 0; round < 2; round++) {
        bh_text *to = round ? &wanted : &text;
        for (int i = 0; i < 200; i++) {
            bh_text_appendf(to, "%*s# comment %d: 20 uA\n", i % 7, "", i);
            if (i == 40)
                bh_text_appendf(to, "beam:\n   current:  %s # why\n", round ? "30 uA" : "20 uA");
            if (i == 90)
                bh_text_appendf(to, "title: '%s'\n", round ? "it''s" : "old");
            if (i == 150)
                bh_text_appendf(to, "l: [1, {a: %s,\n b: x}] # why\n", round ? "7" : "6");
        }
    }
    bh_edit *edit = open_text(text.bytes);
    ck_assert(set(edit, "beam.current", "30 uA") && set(edit, "title", "it's"));
    ck_assert(set(edit, "l.2.a", "7"));
    expect_bytes(edit, wanted.bytes, "comments");
    bh_edit_range r[8];
    ck_assert_uint_eq(bh_edit_changed(edit, r, 8), 3);
    ck_assert_uint_eq(r[0].to - r[0].from, 1);
    ck_assert_int_eq(strncmp(wanted.bytes + r[0].from, "30 uA", 1), 0);
    ck_assert_uint_eq(bh_edit_changed(edit, r, 2), 2);
    ck_assert_uint_eq(bh_edit_changed(edit, r, 1), 1);
    ck_assert_uint_eq(bh_edit_changed(edit, r, 0), 0);
    ck_assert_int_eq(bh_edit_step_at(edit, 0)->lines_after, 1);
    bh_edit_free(edit);
    bh_text_free(&text);
    bh_text_free(&wanted);
}
END_TEST

START_TEST(several_at_once_or_none)
{
    static const bh_edit_change both[] = {{BH_EDIT_REMOVE, "b.kinetic_energy", NULL, 0, NULL},
                                          {BH_EDIT_SET, "b.momentum", "1 GeV/c", 1, NULL}};
    static const bh_edit_change bad[] = {{BH_EDIT_SET, "b.momentum", "1 GeV/c", 0, NULL},
                                         {BH_EDIT_REMOVE, "b.x", NULL, 0, NULL}};
    bh_diags *diags = bh_diags_new();
    bh_edit *edit = open_text("b: {kinetic_energy: 1, p: 2}\n");
    ck_assert(!bh_edit_apply(edit, bad, 2, diags));
    ck_assert_uint_eq(bh_edit_steps(edit), 0);
    ck_assert(bh_edit_apply(edit, both, 2, diags));
    expect_bytes(edit, "b: {momentum: 1 GeV/c, p: 2}\n", "both");
    ck_assert_uint_eq(bh_edit_steps(edit), 1);
    ck_assert_str_eq(bh_edit_step_at(edit, 0)->text, "b.kinetic_energy removed, and 1 more");
    ck_assert_ptr_null(bh_edit_step_at(edit, 1));
    bh_text tried = {0};
    ck_assert(bh_edit_try(edit, &bad[0], 1, &tried, diags));
    ck_assert_str_eq(tried.bytes, "b: {momentum: 1 GeV/c, p: 2}\n");
    ck_assert(set(edit, "b.p", "2")); /* no change, no step */
    ck_assert_uint_eq(bh_edit_steps(edit), 1);
    undo(edit, 1);
    ck_assert(!bh_edit_undo(edit, diags));
    undo(edit, -1);
    ck_assert(!bh_edit_redo(edit, diags));
    bh_text_free(&tried);
    bh_diags_free(diags);
    bh_edit_free(edit);
}
END_TEST

START_TEST(distance_to_what_is_saved)
{
    bh_edit *edit = open_text("a: 1\n");
    bh_edit_range r[4];
    for (int i = 2; i < 7; i++)
        ck_assert(set(edit, "a", (char[]){(char)('0' + i), '\0'}));
    ck_assert_uint_eq(bh_edit_unsaved(edit), 5);
    ck_assert(bh_edit_saved(edit));
    undo(edit, 2);
    ck_assert_uint_eq(bh_edit_unsaved(edit), 2);
    ck_assert_uint_eq(bh_edit_changed(edit, r, 4), 1);
    ck_assert(set(edit, "a", "x")); /* what was saved cannot be redone any more */
    ck_assert_uint_eq(bh_edit_steps(edit), 4);
    ck_assert_uint_eq(bh_edit_unsaved(edit), 3);
    ck_assert_uint_eq(bh_edit_changed(edit, r, 4), 1);
    undo(edit, 3);
    ck_assert_uint_eq(bh_edit_unsaved(edit), 4);
    ck_assert(set(edit, "a", "6")); /* the same bytes, another way */
    ck_assert_uint_eq(bh_edit_unsaved(edit), 0);
    ck_assert_uint_eq(bh_edit_changed(edit, r, 4), 0);
    bh_edit_free(edit);
    bh_edit_free(NULL);
}
END_TEST

/* Values on opposite sides of what changed shift, and ranges that meet are joined. */
START_TEST(ranges_follow_the_text)
{
    bh_edit *edit = open_text("a: 1\nb: 2\nc: 3\nd: 4\n");
    bh_edit_range r[4];
    ck_assert(set(edit, "d", "44444") && set(edit, "b", "22222"));
    ck_assert_uint_eq(bh_edit_changed(edit, r, 4), 2);
    ck_assert(r[0].from == 9 && r[0].to == 13 && r[1].from == 23 && r[1].to == 27);
    const bh_edit_change removed = {.kind = BH_EDIT_REMOVE, .path = "c"};
    bh_diags *diags = bh_diags_new();
    ck_assert(bh_edit_apply(edit, &removed, 1, diags));
    ck_assert_uint_eq(bh_edit_changed(edit, r, 4), 3);
    ck_assert(bh_edit_saved(edit));
    undo(edit, 3);
    ck_assert_uint_ge(bh_edit_changed(edit, r, 4), 2);
    bh_diags_free(diags);
    bh_edit_free(edit);
}
END_TEST

static const struct {
    const char *text, *path;
    bh_edit_kind kind;
    const char *why; /* NULL: allowed */
} allowed[] = {
    {"a: 1\n", "a", BH_EDIT_SET, NULL},
    {"a: 1\n", "a", BH_EDIT_RENAME, NULL},
    {"a: 1\n", "a", BH_EDIT_DUPLICATE, NULL},
    {"a: 1\n", "a", BH_EDIT_REMOVE, "`a` is all there is"},
    {"a: 1\n", "a", BH_EDIT_MOVE, "there is nothing else"},
    {"a: 1\n", "a", BH_EDIT_INSERT, "`a` holds a single value"},
    {"a: 1\n", "", BH_EDIT_INSERT, NULL},
    {"a: 1\n", "", BH_EDIT_REMOVE, "the whole file"},
    {"a: [1, 2]\n", "a", BH_EDIT_SET, NULL},
    {"a: [1, 2]\n", "a", BH_EDIT_INSERT, NULL},
    {"a: [1, 2]\n", "a.2", BH_EDIT_MOVE, NULL},
    {"a: [1, 2]\n", "a.1", BH_EDIT_MOVE, NULL},
    {"a: [1, 2]\n", "a.1", BH_EDIT_DUPLICATE, NULL},
    {"a: [1, 2]\n", "a.1", BH_EDIT_RENAME, "`a.1` is an item"},
    {"a:\n  b: 1\n", "a", BH_EDIT_SET, "`a` has parts"},
    {"a:\nb: |\n  x\n", "a", BH_EDIT_SET, NULL},
    {"a:\nb: |\n  x\n", "b", BH_EDIT_SET, NULL},
    {"? a\n: 1\n? b\n: 2\n", "a", BH_EDIT_REMOVE, "`a` is laid out"},
    {"? a\n: 1\n? b\n: 2\n", "a", BH_EDIT_SET, NULL},
    {"a: [1, # c\n 2]\n", "a.1", BH_EDIT_REMOVE, "`a.1` is laid out"},
};

START_TEST(may_it_be_changed)
{
    bh_edit *edit = open_text(allowed[_i].text);
    bh_diags *diags = bh_diags_new();
    const bh_node *node = bh_document_find(bh_edit_document(edit), allowed[_i].path);
    const bool may = bh_edit_allows(edit, allowed[_i].kind, node, diags);
    ck_assert_msg(may == !allowed[_i].why, "row %d: %s", _i,
                  may ? "" : bh_diags_at(diags, 0)->text);
    if (!may)
        ck_assert_int_eq(
            strncmp(bh_diags_at(diags, 0)->text, allowed[_i].why, strlen(allowed[_i].why)), 0);
    expect_bytes(edit, allowed[_i].text, "asked only");
    ck_assert_uint_eq(bh_edit_version(edit), 0);
    bh_diags_free(diags);
    bh_edit_free(edit);
}
END_TEST

START_TEST(what_the_field_shows)
{
    static const char *const rows_of_fields[][2] = {
        {"q", "it's # x"}, {"f", "[1, {x: 2}]"}, {"n", "two\nlines\n"}, {"e", ""}};
    bh_edit *edit =
        open_text("q: 'it''s # x'\nf: [1, {x: 2}] # c\nn: |\n  two\n  lines\ne:\nb:\n  c: 1\n");
    const bh_document *document = bh_edit_document(edit);
    for (int i = 0; i < COUNT(rows_of_fields); i++) {
        bh_text text = {0};
        const bh_node *node = bh_document_find(document, rows_of_fields[i][0]);
        ck_assert(bh_edit_field(edit, node, &text));
        ck_assert_str_eq(text.bytes, rows_of_fields[i][1]);
        bh_text_free(&text);
    }
    bh_text text = {0};
    ck_assert(!bh_edit_field(edit, bh_document_find(document, "b"), &text));
    bh_edit_free(edit);
}
END_TEST

START_TEST(what_cannot_be_read_is_not_opened)
{
    bh_diags *diags = bh_diags_new();
    ck_assert_ptr_null(bh_edit_open("a: &x 1\n", 8, "p.yaml", diags));
    ck_assert_uint_eq(bh_diags_errors(diags), 1);
    ck_assert_str_eq(bh_diags_at(diags, 0)->at.file, "p.yaml");
    bh_diags_free(diags);
    diags = bh_diags_new();
    bh_edit *edit = bh_edit_open("a: Run #3\n", 10, "p.yaml", diags);
    ck_assert_uint_eq(bh_diags_count(diags), 1); /* a warning */
    ck_assert_uint_eq(bh_diags_count(bh_edit_said(edit)), 1);
    ck_assert(bh_edit_set(edit, "a", "Run #4", diags));
    ck_assert_uint_eq(bh_diags_count(bh_edit_said(edit)), 0); /* in quotes nothing is cut */
    expect_bytes(edit, "a: \"Run #4\" #3\n", "a comment");
    bh_edit_free(edit);
    bh_diags_free(diags);
}
END_TEST

/* What the file holds now is one step, and what is saved. */
START_TEST(another_text_is_a_step)
{
    bh_edit *edit = open_text("a: 1\n");
    const size_t version = bh_edit_version(edit);
    ck_assert(set(edit, "a", "2"));
    ck_assert(!bh_edit_replace(edit, "", 0, "read again")); /* no document */
    expect_bytes(edit, "a: 2\n", "refused");
    ck_assert(bh_edit_steps(edit) == 1 && bh_edit_unsaved(edit) == 1);
    ck_assert(bh_edit_replace(edit, "b: 3\n", 5, "read again"));
    expect_bytes(edit, "b: 3\n", "replaced");
    ck_assert(bh_edit_steps(edit) == 2 && bh_edit_unsaved(edit) == 0);
    ck_assert_uint_eq(bh_edit_version(edit), version + 2);
    ck_assert_str_eq(bh_edit_step_at(edit, 1)->text, "read again");
    ck_assert_str_eq(bh_edit_step_at(edit, 1)->path, "");
    ck_assert(bh_edit_replace(edit, "b: 3\n", 5, "read again") && bh_edit_steps(edit) == 2);
    ck_assert(bh_edit_undo(edit, NULL));
    expect_bytes(edit, "a: 2\n", "back");
    ck_assert_uint_eq(bh_edit_unsaved(edit), 1);
    ck_assert(bh_edit_undo(edit, NULL));
    expect_bytes(edit, "a: 1\n", "further back");
    bh_edit_free(edit);
}
END_TEST

/* Every node is found again by its path, whatever items are called. */
START_TEST(paths_lead_back)
{
    static const char *const paths[][2] = {
        {"a.1", "a.2"}, {"a.2", "a.2"}, {"a.x", "a.x"}, {"a.4", "a.4"}, {"a.5.b", "a.5.b"},
        {"a.9", NULL},  {"a.", NULL},   {"b.c", NULL},  {"b", "b"},     {"", ""}};
    bh_edit *edit = open_text(
        "a: [{name: 2}, {name: 1}, {name: x}, {name: x}, {name: p.q, b: 1}]\nb: {d: 1}\n");
    const bh_document *document = bh_edit_document(edit);
    const bh_node *list = bh_document_find(document, "a");
    for (size_t i = 0; i < list->count; i++) {
        bh_text path = {0};
        bh_trail_of(list->items[i], &path);
        if (i > 1) /* 1 is named 2, and 2 is named 1: by name they are found */
            ck_assert_ptr_eq(bh_document_find(document, path.bytes), list->items[i]);
        bh_text_free(&path);
    }
    for (int i = 0; i < COUNT(paths); i++) {
        const bh_node *node = bh_document_find(document, paths[i][0]);
        ck_assert_msg((node != NULL) == (paths[i][1] != NULL), "%s", paths[i][0]);
    }
    bh_edit_free(edit);
}
END_TEST

/* Long texts: the name in a message is cut, the path of a step is not. */
START_TEST(long_names)
{
    bh_text text = {0};
    for (int i = 0; i < 100; i++)
        bh_text_append(&text, "name");
    bh_text_append(&text, ": 1\nb: 2\n");
    bh_edit *edit = open_text(text.bytes);
    text.bytes[400] = '\0';
    ck_assert(set(edit, text.bytes, "2"));
    ck_assert_uint_lt(strlen(bh_edit_step_at(edit, 0)->text), 140);
    ck_assert_uint_eq(strlen(bh_edit_step_at(edit, 0)->path), 400);
    bh_edit_free(edit);
    bh_text_free(&text);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("edit");
    tcase_add_loop_test(tests, a_change, 0, COUNT(rows));
    tcase_add_test(tests, three_changes_among_comments);
    tcase_add_test(tests, several_at_once_or_none);
    tcase_add_test(tests, distance_to_what_is_saved);
    tcase_add_test(tests, ranges_follow_the_text);
    tcase_add_loop_test(tests, may_it_be_changed, 0, COUNT(allowed));
    tcase_add_test(tests, what_the_field_shows);
    tcase_add_test(tests, what_cannot_be_read_is_not_opened);
    tcase_add_test(tests, another_text_is_a_step);
    tcase_add_test(tests, paths_lead_back);
    tcase_add_test(tests, long_names);
    return run_suite("document/edit", tests);
}
