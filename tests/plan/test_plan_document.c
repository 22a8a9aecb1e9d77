/* test_plan_document.c - docs/plan.md against the table of keys that reads plans. */
#include "../suite.h"

#include <string.h>

#include "beamhours/base/file.h"
#include "beamhours/plan/key_list.h"
#include "beamhours/plan/plan.h"

static bh_text document(void)
{
    bh_text text = {0};
    ck_assert_int_eq(bh_file_read("docs/plan.md", 1 << 20, &text, NULL), BH_OK);
    return text;
}

static const char last_section[] = "\n## Read and checked, without effect yet\n";

/* Each key by its name, in code marks or in an example. */
START_TEST(every_key_is_documented)
{
    bh_text text = document();
    bh_plan_key key;
    for (size_t i = 0; bh_plan_key_at(i, &key); i++) {
        const char *name = strrchr(key.path, '.') ? strrchr(key.path, '.') + 1 : key.path;
        char code[100], example[100];
        snprintf(code, sizeof code, "`%s", name);
        snprintf(example, sizeof example, "%s:", name);
        ck_assert_msg(strstr(text.bytes, code) || strstr(text.bytes, example),
                      "docs/plan.md lacks %s", key.path);
    }
    bh_text_free(&text);
}
END_TEST

/* The closing list is exactly the keys that no number depends on. */
START_TEST(keys_without_effect_are_listed)
{
    bh_text text = document();
    const char *list = strstr(text.bytes, last_section);
    ck_assert_ptr_nonnull(list);
    bh_plan_key key;
    size_t without = 0, lines = 0;
    for (size_t i = 0; bh_plan_key_at(i, &key); i++) {
        char line[100];
        snprintf(line, sizeof line, "\n- `%s`", key.path);
        ck_assert_msg((strstr(list, line) != NULL) == !key.built,
                      "docs/plan.md, last section: %s %s", key.path,
                      key.built ? "has an effect now" : "is missing");
        without += !key.built;
    }
    for (const char *s = list; (s = strstr(s, "\n- `")); s++)
        lines++;
    ck_assert_uint_eq(lines, without);
    bh_text_free(&text);
}
END_TEST

/* The example at the top is a plan. */
START_TEST(the_example_is_read)
{
    bh_text text = document();
    const char *from = strstr(text.bytes, "```yaml\n") + strlen("```yaml\n");
    const size_t length = (size_t)(strstr(from, "```") - from);
    const char *const folders[] = {"materials", NULL};
    bh_material_library *library = bh_material_library_new(folders);
    bh_diags *diags = bh_diags_new();
    bh_plan *plan = bh_plan_read(from, length, "docs/plan.md", NULL, 0, library, diags);
    ck_assert_msg(plan != NULL, "%s", bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "");
    ck_assert_uint_eq(plan->setting_count, 6);
    ck_assert_uint_eq(bh_diags_count(diags), 0);
    bh_plan_free(plan);
    bh_diags_free(diags);
    bh_material_library_free(library);
    bh_text_free(&text);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("plan document");
    tcase_add_test(tests, every_key_is_documented);
    tcase_add_test(tests, keys_without_effect_are_listed);
    tcase_add_test(tests, the_example_is_read);
    return run_suite("plan/document", tests);
}
