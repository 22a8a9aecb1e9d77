/* test_manual.c - what options.h lists stands in the manual page and in the completions; the page
 * is clean, and the completions load and complete.  What needs a program that is not here is
 * skipped with a line that says so. */
#include "../suite.h"

#include <stdbool.h>
#include <stdio.h>
#include <string.h>
#include <unistd.h>

#include "beamhours/base/file.h"
#include "beamhours/command/options.h"

struct option {
    char letter;
    const char *name, *commands, *values;
};

static const struct option options[] = {
#define ROW(id, letter, name, argument, commands, values, meaning) {letter, name, commands, values},
    BH_OPTIONS(ROW)
#undef ROW
};

static const char *const commands[] = {
#define ROW(id, name, behind, summary, run) name,
    BH_COMMANDS(ROW)
#undef ROW
};

static const char *const shells[] = {"bash", "zsh", "fish"};

/* The folder that this program was built in: build/ of build/tests/command/test_manual. */
static const char *build(char out[1024])
{
    const ssize_t n = readlink("/proc/self/exe", out, 1000);
    ck_assert_int_gt(n, 0);
    out[n] = '\0';
    for (int up = 0; up < 3; up++)
        *strrchr(out, '/') = '\0';
    return out;
}

static bh_text read_file(const char *path)
{
    bh_text text = {0};
    bh_error err = {.code = BH_OK};
    ck_assert_msg(!bh_file_read(path, 1 << 20, &text, &err), "%s: %s", path, err.text);
    return text;
}

static bh_text completion(const char *shell)
{
    char folder[1024], path[1100];
    snprintf(path, sizeof path, "%s/completions/%s", build(folder), shell);
    return read_file(path);
}

static bool there(const char *program)
{
    char line[200];
    snprintf(line, sizeof line, "command -v %s >/dev/null 2>&1", program);
    if (system(line) == 0)
        return true;
    printf("test_manual: skipped: no %s here\n", program);
    return false;
}

/* What a shell command writes on its outputs. */
static const char *said(const char *line, char *out, size_t size)
{
    FILE *from = popen(line, "r");
    ck_assert_ptr_nonnull(from);
    const size_t n = fread(out, 1, size - 1, from);
    out[n] = '\0';
    pclose(from);
    return out;
}

/* ".It Ic table" for each command; "Fl -bins" or "Fl f , -format" for each option, inside OPTIONS.
 */
START_TEST(the_manual_has_every_command_and_option)
{
    bh_text page = read_file("docs/beamhours.1");
    char words[100];
    for (int i = 0; i < COUNT(commands); i++) {
        snprintf(words, sizeof words, "\n.It Ic %s", commands[i]);
        ck_assert_msg(strstr(page.bytes, words) != NULL, "the manual lacks %s", commands[i]);
    }
    const char *list = strstr(page.bytes, "\n.Sh OPTIONS");
    ck_assert_ptr_nonnull(list);
    for (int i = 0; i < COUNT(options); i++) {
        if (options[i].letter)
            snprintf(words, sizeof words, "\n.It Fl %c , -%s", options[i].letter, options[i].name);
        else
            snprintf(words, sizeof words, "\n.It Fl -%s", options[i].name);
        ck_assert_msg(strstr(list, words) != NULL, "the manual lacks --%s", options[i].name);
    }
    bh_text_free(&page);
}
END_TEST

/* And nothing that the program does not know. */
START_TEST(the_manual_has_no_other_option)
{
    bh_text page = read_file("docs/beamhours.1");
    for (const char *s = page.bytes; (s = strstr(s, "\n.It Fl ")); s++) {
        const char *name = strchr(s, '-') + 1;
        const size_t length = strcspn(name, " \n");
        bool known = false;
        for (int i = 0; i < COUNT(options) && !known; i++)
            known =
                strlen(options[i].name) == length && strncmp(options[i].name, name, length) == 0;
        ck_assert_msg(known, "the manual has --%.*s", (int)length, name);
    }
    bh_text_free(&page);
}
END_TEST

START_TEST(the_manual_names_every_exit_status)
{
    static const char *const statuses[] = {"0", "64", "65", "66", "70", "73", "74"};
    bh_text page = read_file("docs/beamhours.1");
    char words[32];
    for (int i = 0; i < COUNT(statuses); i++) {
        snprintf(words, sizeof words, "\n.It %s\n", statuses[i]);
        ck_assert_msg(strstr(page.bytes, words) != NULL, "no status %s", statuses[i]);
    }
    bh_text_free(&page);
}
END_TEST

START_TEST(the_manual_is_clean)
{
    char out[4096];
    if (there("mandoc"))
        ck_assert_str_eq(said("mandoc -Tlint -Wwarning docs/beamhours.1 2>&1", out, sizeof out),
                         "");
}
END_TEST

START_TEST(completions_have_every_command_and_option)
{
    for (int s = 0; s < COUNT(shells); s++) {
        bh_text text = completion(shells[s]);
        for (int i = 0; i < COUNT(commands); i++)
            ck_assert_msg(strstr(text.bytes, commands[i]) != NULL, "%s lacks %s", shells[s],
                          commands[i]);
        for (int i = 0; i < COUNT(options); i++) {
            char words[64];
            snprintf(words, sizeof words, strcmp(shells[s], "fish") == 0 ? "-l %s" : "--%s",
                     options[i].name);
            ck_assert_msg(strstr(text.bytes, words) != NULL, "%s lacks --%s", shells[s],
                          options[i].name);
        }
        bh_text_free(&text);
    }
}
END_TEST

START_TEST(completions_load)
{
    static const char *const load[] = {
        "bash --norc -c '. \"$built\"/completions/bash' 2>&1",
        /* one string, two lines */
        ("zsh -f -c 'zsh -n \"$built\"/completions/zsh && functions[_beamhours]=$(<\"$built\""
         "/completions/zsh)' 2>&1"),
        "fish --no-config -c 'source $built/completions/fish' 2>&1"};
    char folder[1024], out[4096];
    ck_assert_int_eq(setenv("built", build(folder), 1), 0);
    if (there(shells[_i]))
        ck_assert_str_eq(said(load[_i], out, sizeof out), "");
}
END_TEST

static const struct {
    const char *words; /* as bash splits them */
    const char *wanted, *unwanted;
} typed[] = {
    {"beamhours ta", "table", "explain"},
    {"beamhours --v", "--version", "--help"},
    {"beamhours table --co", "--columns", "--bins"},
    {"beamhours table --format ''", "text csv json", "svg"},
    {"beamhours table --format = c", "csv", "json"},
    {"beamhours table -f j", "json", "csv"},
    {"beamhours curve --against e", "energy epsilon", "angle"},
    {"beamhours point --particle mu", "muon- muon+", "pion"},
    {"beamhours help ex", "explain", "table"},
    {"beamhours table --output docs/be", "docs/beamhours.1", "--"},
    {"beamhours table plans/le", "plans/lead.yaml", "--"},
    {"beamhours explain plans/lead.yaml --a", "--arm", "--bin"},
};

START_TEST(bash_completes)
{
    char folder[1024], line[4096], out[4096];
    if (!there("bash"))
        return;
    snprintf(line, sizeof line,
             "bash --norc -c '. %s/completions/bash; COMP_WORDS=(%s); "
             "COMP_CWORD=$((${#COMP_WORDS[@]} - 1)); _beamhours; echo \"${COMPREPLY[*]}\"' 2>&1",
             build(folder),
             strcmp(typed[_i].words, "beamhours table --format ''") == 0
                 ? "beamhours table --format \"\""
                 : typed[_i].words);
    said(line, out, sizeof out);
    ck_assert_msg(strstr(out, typed[_i].wanted) != NULL, "%s: %s", typed[_i].words, out);
    ck_assert_msg(strstr(out, typed[_i].unwanted) == NULL, "%s: %s", typed[_i].words, out);
}
END_TEST

START_TEST(fish_completes)
{
    char folder[1024], line[4096], out[4096];
    if (!there("fish"))
        return;
    snprintf(
        line, sizeof line,
        "cd / && fish --no-config -c 'source %s/completions/fish; complete -C \"beamhours table "
        "--form\"; complete -C \"beamhours ex\"' 2>&1",
        build(folder));
    said(line, out, sizeof out);
    ck_assert_msg(strstr(out, "--format") && strstr(out, "explain"), "%s", out);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("manual");
    tcase_set_timeout(tests, 60);
    tcase_add_test(tests, the_manual_has_every_command_and_option);
    tcase_add_test(tests, the_manual_has_no_other_option);
    tcase_add_test(tests, the_manual_names_every_exit_status);
    tcase_add_test(tests, the_manual_is_clean);
    tcase_add_test(tests, completions_have_every_command_and_option);
    tcase_add_loop_test(tests, completions_load, 0, COUNT(shells));
    tcase_add_loop_test(tests, bash_completes, 0, COUNT(typed));
    tcase_add_test(tests, fish_completes);
    return run_suite("command/manual", tests);
}
