/* test_syntax.c - each slip is told at its place, in its sentence. */
#include "../suite.h"

#include <string.h>

#include "beamhours/base/sentences.h"
#include "beamhours/document/node.h"

static const struct {
    const char *yaml;
    int line, column;
    const char *key, *begins, *sentence; /* the text's beginning; the sentence it is of */
} slips[] = {
    {"", 1, 1, "plan", "the file holds only", BH_SAY_EMPTY},
    {"# c\n\n", 1, 1, "plan", "the file holds only", BH_SAY_EMPTY},
    {"---\n...\n", 1, 1, "plan", "the file holds only", BH_SAY_EMPTY},
    {"a: b\nc\xE9: 1\n", 2, 2, "plan", "the byte 0xE9", BH_SAY_NOT_UTF8},
    {"\xFF\xFE", 1, 1, "plan", "the byte 0xFF", BH_SAY_NOT_UTF8},
    {"a: \xC3", 1, 4, "plan", "the byte 0xC3", BH_SAY_NOT_UTF8},
    {"a: \xED\xA0\x80", 1, 4, "plan", "the byte 0xED", BH_SAY_NOT_UTF8},
    {"a: \xC0\xAF", 1, 4, "plan", "the byte 0xC0", BH_SAY_NOT_UTF8},
    {"a: \xF5\x80\x80\x80", 1, 4, "plan", "the byte 0xF5", BH_SAY_NOT_UTF8},
    {"a: \xE0\x80\x80", 1, 4, "plan", "the byte 0xE0", BH_SAY_NOT_UTF8},
    {"a: b\rc: d\r", 1, 5, "plan", "the character U+000D", BH_SAY_LINE_END},
    {"a: \xC2\xB1\xC2\x85", 1, 5, "plan", "the character U+0085", BH_SAY_LINE_END},
    {"a: \"\xE2\x80\xA8\"", 1, 5, "plan", "the character U+2028", BH_SAY_LINE_END},
    {"a: # \xE2\x80\xA9", 1, 6, "plan", "the character U+2029", BH_SAY_LINE_END},
    {"a: \x01", 1, 4, "plan", "the character U+0001", BH_SAY_HIDDEN},
    {"a: \x7F", 1, 4, "plan", "the character U+007F", BH_SAY_HIDDEN},
    {"a: \xEF\xBB\xBF", 1, 4, "plan", "the character U+FEFF", BH_SAY_HIDDEN},
    {"a:\n  b: \"\\e[2J\"", 2, 6, "a", "the character U+001B", BH_SAY_HIDDEN},
    {"a: \"\\0\"", 1, 4, "plan", "the character U+0000", BH_SAY_HIDDEN},
    {"a: 1\n---\nb: 2\n", 2, 1, "plan", "a second document", BH_SAY_SECOND_DOCUMENT},
    {"a: 1\n...\nb: 2\n", 3, 1, "plan", "a second document", BH_SAY_SECOND_DOCUMENT},
    {"%YAML 1.1\n---\na: 1\n", 1, 1, "plan", "a line may not", BH_SAY_DIRECTIVE},
    {"%YAML 9.1\n---\na: 1\n", 1, 1, "plan", "a line may not", BH_SAY_DIRECTIVE},
    {"%TAG ! x:\n---\na: 1\n", 1, 1, "plan", "a line may not", BH_SAY_DIRECTIVE},
    {"%TAG\n---\na: 1\n", 1, 1, "plan", "a line may not", BH_SAY_DIRECTIVE},
    {"%YAML 1.1\n%YAML 1.1\n---\na: 1\n", 2, 1, "plan", "a line may not", BH_SAY_DIRECTIVE},
    {"%x\n---\na: 1\n", 1, 1, "plan", "a line may not", BH_SAY_DIRECTIVE},
    {"a: &x 1\n", 1, 4, "plan", "`&x` names", BH_SAY_ANCHOR},
    {"a: {b: &x [1]}\n", 1, 8, "a", "`&x` names", BH_SAY_ANCHOR},
    {"a: [&x {}]\n", 1, 5, "a", "`&x` names", BH_SAY_ANCHOR},
    {"a: *x\n", 1, 4, "plan", "`*x` repeats", BH_SAY_ALIAS},
    {"*x : 1\n", 1, 1, "plan", "`*x` repeats", BH_SAY_ALIAS},
    {"a: !!str 1\n", 1, 4, "plan", "`!!str` prescribes", BH_SAY_TAG},
    {"a: ! 1\n", 1, 4, "plan", "`!` prescribes", BH_SAY_TAG},
    {"a: !x!y 1\n", 1, 4, "plan", "`!x!y 1` prescribes", BH_SAY_TAG},
    {"a: !<x\n", 1, 4, "plan", "`!<x` prescribes", BH_SAY_TAG},
    {"a: !!map {}\n", 1, 4, "plan", "`!!map` prescribes", BH_SAY_TAG},
    {"a: {<<: 1}\n", 1, 5, "a", "`<<` takes over", BH_SAY_MERGE},
    {"a: 1\nb: 1\n\"a\": 2\n", 3, 1, "plan", "`a` was already given in line 1", BH_SAY_KEY_TWICE},
    {"a:\n- {b: 1, b: 2}\n", 2, 10, "a.1", "`b` was already given in line 2", BH_SAY_KEY_TWICE},
    {"? [a]\n: b\n", 1, 3, "plan", "brackets or a list", BH_SAY_KEY_NO_WORD},
    {"{a: 1}: b\n", 1, 1, "plan", "brackets or a list", BH_SAY_KEY_NO_WORD},
    {": b\n", 1, 1, "plan", "nothing stands before", BH_SAY_KEY_EMPTY},
    {"a: 1\n: b\n", 2, 1, "plan", "nothing stands before", BH_SAY_KEY_EMPTY},
    {"'': b\n", 1, 1, "plan", "nothing stands before", BH_SAY_KEY_EMPTY},
    {"{a: 1, : 2}\n", 1, 8, "plan", "nothing stands before", BH_SAY_KEY_EMPTY},
    {"plan: 1\ntitle: Run: first\n", 2, 11, "plan", "`title: Run: first` has", BH_SAY_SECOND_COLON},
    {"a: \"b\": c\n", 1, 7, "plan", "`a: \"b\": c` has", BH_SAY_SECOND_COLON},
    {"beam:\n  a: b\n    c: d\n", 3, 5, "beam", "this line is indented more", BH_SAY_DEEPER},
    {"a: b\n\n c: d\n", 3, 2, "plan", "this line is", BH_SAY_DEEPER},
    {"plan 1\n\ntitle: x\n", 1, 1, "plan", "`plan 1` has no colon", BH_SAY_NO_COLON},
    {"beam:\n  a 1\n  b: 2\n", 2, 3, "plan", "`a 1` has no colon", BH_SAY_NO_COLON},
    {"a: 1\nb:2\nc: 3\n", 2, 1, "plan", "`b:2` has no colon", BH_SAY_NO_COLON},
    {"a: {b:1}\n", 1, 5, "a", "the colon has no blank", BH_SAY_COLON_TIGHT},
    {"a: {b:}\n", 1, 6, "a", "the colon has no blank", BH_SAY_COLON_TIGHT},
    {"a: 1\nb: \"c\nd: 1\n", 2, 4, "plan", "the text in quotes", BH_SAY_QUOTE_OPEN},
    {"a: 'c\n---\n", 1, 4, "plan", "the text in quotes", BH_SAY_QUOTE_OPEN},
    {"a: [1, 2\nb: 3\n", 1, 4, "a", "`[` in line 1 is not closed: before `: 3`",
     BH_SAY_BRACKET_OPEN},
    {"a: {b: 1\n", 1, 4, "a", "`{` in line 1 is not closed: before `the end`", BH_SAY_BRACKET_OPEN},
    {"a: [", 1, 5, "a", "`[` in line 1 is not closed: before `the end`", BH_SAY_BRACKET_OPEN},
    {"a: {b: [1, 2}\n", 1, 13, "a.b", "`[` in line 1 is not closed: before `}`",
     BH_SAY_BRACKET_OPEN},
    {"a: \"x\" y\n", 1, 8, "plan", "`y` follows a value", BH_SAY_AFTER_VALUE},
    {"a: 'it's'\n", 1, 8, "plan", "`s'` follows a value", BH_SAY_AFTER_VALUE},
    {"a: [1] y\n", 1, 8, "plan", "`y` follows a value", BH_SAY_AFTER_VALUE},
    {"[1] y\n", 1, 5, "plan", "`y` follows a value", BH_SAY_AFTER_VALUE},
    {"a: [1,,2]\n", 1, 7, "a", "`,2]` stands where", BH_SAY_NO_VALUE_HERE},
    {"a: ]\n", 1, 4, "plan", "`]` stands where", BH_SAY_NO_VALUE_HERE},
    {"{a: 1,5 cm}\n", 1, 5, "plan", "the comma between `1` and `5 cm` ends", BH_SAY_COMMA_PARTS},
    {"k: {a: 2, b: 20,000, c: 1}\n", 1, 14, "k", "the comma between `20` and", BH_SAY_COMMA_PARTS},
    {"{a: \xC2\xB1"
     "1,5 cm}\n",
     1, 5, "plan", "the comma between", BH_SAY_COMMA_PARTS},
    {"a: x\xE2\x80\x8By\n", 1, 5, "plan", "the character U+200B", BH_SAY_HIDDEN},
    {"a: x\xE2\x80\xAEy\n", 1, 5, "plan", "the character U+202E", BH_SAY_HIDDEN},
    {"a: x\xE2\x81\xA6y\n", 1, 5, "plan", "the character U+2066", BH_SAY_HIDDEN},
    {"a:\n\tb: 1\n", 2, 1, "plan", "a tab stands", BH_SAY_TAB},
    {"a:\n  b: 1\n\tc: 2\n", 3, 1, "a", "a tab stands", BH_SAY_TAB},
    {"a: b\n\tc\n", 2, 1, "plan", "a tab stands", BH_SAY_TAB},
    {"a: |\n\tx\n", 2, 1, "plan", "a tab stands", BH_SAY_TAB},
    {"a:\n  - b: 1\n \tc: 2\n", 3, 2, "a.1", "a tab stands", BH_SAY_TAB},
    {"a: b\n \tc: 1\n", 2, 4, "plan", "a tab stands", BH_SAY_TAB},
    {"a: @x\n", 1, 4, "plan", "`@` cannot begin", BH_SAY_CHARACTER},
    {"a: %5\n", 1, 4, "plan", "`%` cannot begin", BH_SAY_CHARACTER},
    {"a: ? x\n", 1, 4, "plan", "`?` cannot begin", BH_SAY_CHARACTER},
    {"a: * x\n", 1, 4, "plan", "`*` cannot begin", BH_SAY_CHARACTER},
    {"a: & x\n", 1, 4, "plan", "`&` cannot begin", BH_SAY_CHARACTER},
    {"a: - b\n", 1, 4, "plan", "a list with dashes", BH_SAY_DASH},
    {"a:\n   b: 1\n  c: 2\n", 3, 3, "plan", "this line does not line up", BH_SAY_LINED_UP},
    {"  a: 1\nb: 2\n", 2, 1, "plan", "this line does not line up", BH_SAY_LINED_UP},
    {"a:\n  - 1\n - 2\n", 3, 2, "plan", "this line does not line up", BH_SAY_LINED_UP},
    {"a: 1\n- b\n", 2, 1, "plan", "`- b` mixes", BH_SAY_MIXED},
    {"- a\nb: c\n", 2, 1, "plan", "`b: c` mixes", BH_SAY_MIXED},
    {"a: \"C:\\q\"\n", 1, 7, "plan", "`\\q` has no meaning within double quotes; write \\\\",
     BH_SAY_ESCAPE},
    {"a: \"\\xZZ\"\n", 1, 7, "plan", "`\\x` has no", BH_SAY_ESCAPE},
    {"a: \"\\\xC2\xB5\"\n", 1, 5, "plan", "`\\\xC2\xB5` has no", BH_SAY_ESCAPE},
    {"a: | x\n  t\n", 1, 6, "plan", "`x` cannot stand here", BH_SAY_BLOCK_HEADER},
    {"a: |0\n  t\n", 1, 5, "plan", "`0` cannot stand here", BH_SAY_BLOCK_HEADER},
    {"title: Run #3\n", 1, 12, "title", "everything from `#3` on", BH_WARN_CUT},
    {"a:\n  - Run #b\n", 2, 9, "a.1", "everything from `#b` on", BH_WARN_CUT},
    {"a: #3\n", 1, 4, "a", "everything from `#3` on", BH_WARN_CUT},
    {"a: 5 #3\n", 1, 6, "a", "everything from `#3` on", BH_WARN_CUT},
};

/* Has `text` the words of the format `sentence`, in order? */
static bool fits(const char *text, const char *sentence)
{
    char piece[256];
    while (*sentence) {
        size_t n = 0;
        while (*sentence && (*sentence != '%' || sentence[1] == '%')) {
            sentence += *sentence == '%';
            piece[n++] = *sentence++;
        }
        piece[n] = '\0';
        const char *found = strstr(text, piece);
        if (!found)
            return false;
        text = found + n;
        if (*sentence)
            sentence += strcspn(sentence, "csdXu") + 1;
    }
    return true;
}

START_TEST(slips_are_told)
{
    bh_diags *diags = bh_diags_new();
    const char *yaml = slips[_i].yaml;
    bh_document *d = bh_document_parse(yaml, strlen(yaml), "p.yaml", diags);
    const bool warning = strcmp(slips[_i].sentence, BH_WARN_CUT) == 0;
    ck_assert_msg(bh_diags_count(diags) == 1, "%zu complaints: %s", bh_diags_count(diags), yaml);
    const bh_diag *said = bh_diags_at(diags, 0);
    ck_assert_int_eq(d != NULL, warning);
    ck_assert_int_eq(said->severity, warning ? BH_SEVERITY_WARNING : BH_SEVERITY_ERROR);
    ck_assert_msg(strncmp(said->text, slips[_i].begins, strlen(slips[_i].begins)) == 0,
                  "%s: said: %s", yaml, said->text);
    ck_assert_msg(fits(said->text, slips[_i].sentence), "%s: said: %s", yaml, said->text);
    ck_assert_str_eq(said->key, slips[_i].key);
    ck_assert_msg(said->at.line == slips[_i].line && said->at.column == slips[_i].column,
                  "%s: at %d:%d", yaml, said->at.line, said->at.column);
    ck_assert_str_eq(said->at.file, "p.yaml");
    bh_document_free(d);
    bh_diags_free(diags);
}
END_TEST

static const char *const comments[] = {
    "a: 855 MeV # mean\n",
    "a: 855 MeV   #mean\n",
    "a: 20 uA #was 10\n",
    "a: \"Run\" #3\n",
    "a: (2 \xC2\xB1 1) m #x\n",
    "a: -3 mrad #x\n",
    "a: #comment\n  b: 1\n",
    "a: b#3\n",
    "a: [1, 2] #3\n",
    "#3\na: b\n",
    "a: word\n#3\n",
    "a: word #\n",
    "a: word #!x\n",
    "a: |\n  Run #3\n",
};

START_TEST(comments_are_no_slips)
{
    bh_diags *diags = bh_diags_new();
    bh_document *d = bh_document_parse(comments[_i], strlen(comments[_i]), "p.yaml", diags);
    ck_assert_ptr_nonnull(d);
    ck_assert_msg(bh_diags_count(diags) == 0, "%s", comments[_i]);
    bh_document_free(d);
    bh_diags_free(diags);
}
END_TEST

START_TEST(all_is_told_at_once_and_syntax_ends_the_list)
{
    static const char yaml[] = "a: &x 1\nb: {c: 1, c: 2}\nd: Run #3\na: *x\ne: [1\nf: &y 1\n";
    static const int lines[] = {1, 2, 3, 4, 5};
    bh_diags *diags = bh_diags_new();
    ck_assert_ptr_null(bh_document_parse(yaml, sizeof yaml - 1, "p.yaml", diags));
    bh_diags_sort(diags);
    ck_assert_uint_eq(bh_diags_count(diags), (size_t)COUNT(lines));
    for (int i = 0; i < COUNT(lines); i++)
        ck_assert_int_eq(bh_diags_at(diags, (size_t)i)->at.line, lines[i]);
    ck_assert_uint_eq(bh_diags_errors(diags), (size_t)COUNT(lines) - 1);
    bh_diags_free(diags);
}
END_TEST

/* What is quoted from a file stays short and whole. */
START_TEST(long_texts_are_cut_between_characters)
{
    char yaml[1000] = "a: 1\n";
    for (int i = 0; i < 100; i++)
        strcat(yaml, "\xE2\x88\x92");
    strcat(yaml, "\nb: 2\n");
    bh_diags *diags = bh_diags_new();
    ck_assert_ptr_null(bh_document_parse(yaml, strlen(yaml), "p.yaml", diags));
    const char *text = bh_diags_at(diags, 0)->text;
    ck_assert_int_lt((int)strlen(text), 150);
    ck_assert_ptr_nonnull(strstr(text, "\xE2\x88\x92...`"));
    bh_diags_free(diags);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("syntax");
    tcase_add_loop_test(tests, slips_are_told, 0, COUNT(slips));
    tcase_add_loop_test(tests, comments_are_no_slips, 0, COUNT(comments));
    tcase_add_test(tests, all_is_told_at_once_and_syntax_ends_the_list);
    tcase_add_test(tests, long_texts_are_cut_between_characters);
    return run_suite("document/syntax", tests);
}
