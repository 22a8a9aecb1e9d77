/* test_shown.c - keys in, screens out, compared with docs/screens; `make screens` writes them anew.
 */
#include "../suite.h"

#include <errno.h>
#include <gsl/gsl_errno.h>
#include <limits.h>
#include <stdbool.h>
#include <stdlib.h>
#include <unistd.h>

#include "beamhours/base/file.h"
#include "beamhours/screen/model.h"
#include "driven.h"

#define TEN_RIGHT "<Right><Right><Right><Right><Right><Right><Right><Right><Right><Right>"

/* Two arms in coincidence; names too long for the table, and of more than 60 characters together.
 */
#define LONG_NAMES                                                                                \
    "-plan: 1\n"                                                                                  \
    "beam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uA}\n"                       \
    "target: {name: t, layers: [{material: liquid-hydrogen, thickness: 50 mm}]}\n"                \
    "arms:\n"                                                                                     \
    "  - {name: spectrometer-with-a-long-name-A, in_plane: ±28 mrad, out_of_plane: ±70 mrad,\n" \
    "     energy_cut: 10 MeV}\n"                                                                  \
    "  - {name: spectrometer-with-a-long-name-B, side: left, detects: recoil,\n"                  \
    "     in_plane: ±60 mrad, out_of_plane: ±90 mrad, threshold: 5 MeV}\n"                      \
    "settings:\n"                                                                                 \
    "  - name: setting-with-a-long-name-1\n"                                                      \
    "    arms:\n"                                                                                 \
    "      - {arm: spectrometer-with-a-long-name-A, angle: 40 deg}\n"                             \
    "      - {arm: spectrometer-with-a-long-name-B, angle: conjugate}\n"                          \
    "    coincidence:\n"                                                                          \
    "      arms: [spectrometer-with-a-long-name-A, spectrometer-with-a-long-name-B]\n"            \
    "      window: 30 ns\n"                                                                       \
    "    time: 1 h\n"

static const struct {
    const char *name, *demo, *keys;
    int rows, columns;
    bool ascii;
    size_t evaluated; /* settings, all in all; 0: whatever */
} screens[] = {
    {"start", "hydrogen-separation", "", 24, 80, false, 6},
    {"typing", "hydrogen-separation", "lcurrent<Escape>4 uA", 24, 80, false, 12},
    {"invalid", "hydrogen-separation", "lcurrent<Escape>30 uX", 24, 80, false, 6},
    {"kept", "hydrogen-separation", "lcurrent<Escape>4 uA<Enter>", 24, 80, false, 12},
    {"left", "hydrogen-separation", "lcurrent<Escape>4 uA<Escape>", 24, 80, false, 12},
    {"stepped", "hydrogen-separation", "lefficiency<Escape><Enter><Home><Right><Right><Up><Up>", 24,
     80, false, 0},
    {"back", "hydrogen-separation", "lcurrent<Escape>4 uA<Enter>b", 24, 80, false, 12},
    {"forth", "hydrogen-separation", "lcurrent<Escape>4 uA<Enter>bf", 24, 80, false, 12},
    {"added", "hydrogen-separation", "lsettings<Escape>a", 24, 80, false, 7},
    {"added-setting", "positron-electron", "lsettings<Escape>a", 24, 80, false, 5},
    {"added-layer", "alpha-gold", "llayers<Escape>a", 24, 80, false, 0},
    {"added-key", "hydrogen-separation",
     "lbeam<Escape>afraction<Enter><Rubout><Rubout><Rubout><Rubout>90 %<Enter>", 24, 80, false, 0},
    {"duplicated", "positron-electron", "lplus-forward<Escape><Left><Left>d", 24, 80, false, 5},
    {"removed", "positron-electron", "lplus-forward<Escape><Left><Left>r", 24, 80, false, 4},
    {"moved", "positron-electron", "lplus-forward<Escape><Left><Left>>>", 24, 80, false, 4},
    {"ordered-by-angle", "hydrogen-separation", "<Tab><Right>o", 24, 80, false, 6},
    {"ordered", "positron-electron", "<Tab><Right><Right><Right><Right>oo", 24, 80, false, 4},
    {"pinned", "hydrogen-separation", "<Tab>p<Tab>lefficiency<Escape>80 %<Enter>", 24, 80, false,
     12},
    {"bins", "hydrogen-separation", "<Tab><Down><Enter>", 24, 80, false, 7},
    {"choose-material", "hydrogen-separation", "lmaterial<Escape><Enter>", 24, 80, false, 0},
    {"choose-narrowed", "hydrogen-separation", "lmaterial<Escape><Enter>tung", 24, 80, false, 0},
    {"choose-particle", "hydrogen-separation", "lparticle<Escape><Enter><Down>", 24, 80, false, 0},
    {"choose-key", "hydrogen-separation", "lbeam<Escape>a", 24, 80, false, 6},
    {"choose-model", "hydrogen-separation", "<Home>amodels<Enter>", 24, 80, false, 0},
    {"rates", "positron-electron", "<Tab>v", 24, 80, false, 4},
    {"counts", "hydrogen-separation", "<Tab>vv", 24, 80, false, 6},
    {"no-curve", "hydrogen-separation", "vvv", 24, 80, false, 6},
    {"other-part", "hydrogen-separation", "w", 24, 80, false, 6},
    {"no-key", "hydrogen-separation", "<Tab>x", 24, 80, false, 6},
    {"narrow", "hydrogen-separation", "<Tab>", 8, 30, false, 0},
    {"not-found-long", "hydrogen-separation", "lno word as long as this one stands there", 24, 80,
     false, 6},
    {"help", "hydrogen-separation", "?", 24, 80, false, 6},
    {"help-end", "hydrogen-separation", "?<End>", 24, 80, false, 6},
    {"cautions", "hydrogen-separation", "c", 24, 80, false, 6},
    {"messages", "positron-electron", "m", 24, 80, false, 4},
    {"to-the-line", "hydrogen-separation", "m<Enter>", 24, 80, false, 6},
    {"to-the-plan", "hydrogen-separation", "<Tab><Down><Down>t", 24, 80, false, 6},
    {"explained", "hydrogen-separation", "<Tab>e<PageDown>", 24, 80, false, 6},
    {"take-hours", "hydrogen-separation", "<Tab>w2 h", 24, 80, false, 7},
    {"take-taken", "hydrogen-separation", "<Tab>w2 h<Enter>", 24, 80, false, 7},
    {"take-current", "hydrogen-separation", "<Tab>w0.3 h<Down><Right>", 24, 80, false, 0},
    {"take-small", "hydrogen-separation", "<Tab>w2 h", 10, 40, false, 0},
    {"take-small-arm", "positron-electron", "<Tab><Down>w", 10, 40, false, 0},
    {"take-small-long", LONG_NAMES, "<Tab>w", 10, 40, false, 0},
    {"take-none", "hydrogen-separation", "<Tab><Right><Right>0.6<Down><Right><Right>", 24, 80,
     false, 0},
    {"take-wrong", "hydrogen-separation", "<Tab><Right><Right>5 h", 24, 80, false, 0},
    {"take-share", LONG_NAMES, "<Tab><Down><Down>w<Up><Right>0.01<Down><Right>", 24, 80, false, 0},
    {"long-names", LONG_NAMES, "<Tab><Down><Down>", 24, 80, false, 0},
    {"long-names-small", LONG_NAMES, "<Tab><Down><Down>", 10, 40, false, 0},
    /* the hours have no room beside two arms, and take some as soon as it shows what they were */
    {"typing-arms", "hydrogen-jet", "lcurrent<Escape>600 uA", 24, 80, false, 0},
    {"replaces", "hydrogen-separation",
     "lbeam<Escape>atotal<Enter><Rubout><Rubout><Rubout><Rubout><Rubout><Rubout><Rubout><Rubout>"
     "950 MeV<Enter>",
     24, 80, false, 0},
    {"info", "hydrogen-separation", "lmomentum_bite<Escape>i", 24, 80, false, 6},
    {"history", "hydrogen-separation", "lcurrent<Escape>4 uA<Enter>lgoal<Escape>2 %<Enter>bh", 24,
     80, false, 0},
    {"leave", "hydrogen-separation", "lcurrent<Escape>4 uA<Enter>q", 24, 80, false, 12},
    {"looked-for", "hydrogen-separation", "lmaterial<Enter>", 24, 80, false, 6},
    {"not-found", "hydrogen-separation", "lxyzzy", 24, 80, false, 6},
    {"as-text", "hydrogen-separation", "lin_plane<Escape>=", 24, 80, false, 6},
    {"text", "hydrogen-separation", "lnotes<Escape><Enter><Tab>A third line.<Up><Home>So: ", 24, 80,
     false, 0},
    {"text-small", "hydrogen-separation", "lnotes<Escape><Enter><Tab>A third line.", 10, 40, false,
     0},
    {"columns-further", "hydrogen-separation",
     "<Tab><Right><Right><Right><Right><Right><Right><Right><Right><Right><Right>", 24, 80, false,
     6},
    /* computed when they come into view, and the table is in their order at once */
    {"columns-of-changes", "hydrogen-separation",
     "<Tab>" TEN_RIGHT TEN_RIGHT TEN_RIGHT TEN_RIGHT "o", 24, 80, false, 12},
    {"large", "hydrogen-separation", "", 60, 200, false, 6},
    /* warnings stay while something is typed; a change of the last digits, as that of Q2 here, is
     * none that is shown */
    {"large-typing", "hydrogen-separation", "<Tab><Right><Right><Tab>lcurrent<Escape>4 uA", 60, 200,
     false, 12},
    /* where the plan's part is wide enough a text stands there, and the table in sight */
    {"large-explained", "hydrogen-separation", "<Tab>e", 60, 200, false, 6},
    {"large-key", "hydrogen-separation", "lbeam<Escape>a", 60, 200, false, 6},
    {"large-text", "hydrogen-separation", "lnotes<Escape><Enter>", 60, 200, false, 0},
    /* wrapped anew, what was in view about where it was */
    {"resized-help", "hydrogen-separation", "<Size 200x60>?<Size 80x24><PageDown><Size 70x20>", 24,
     80, false, 6},
    {"resized-explained", "hydrogen-separation", "<Tab>e<PageDown><Size 60x20>", 24, 80, false, 6},
    {"small", "hydrogen-separation", "", 10, 40, false, 6},
    {"small-table", "hydrogen-separation", "<Tab>", 10, 40, false, 6},
    {"tiny", "hydrogen-separation", "", 3, 12, false, 6},
    {"resized-while-typing", "hydrogen-separation",
     "lcurrent<Escape>4<Size 200x60> u<Size 40x10>A<Size 80x24>", 24, 80, false, 0},
    {"ascii", "hydrogen-separation", "lin_plane<Escape>", 24, 80, true, 6},
    {"rings", "muon-rings", "<Tab>", 24, 100, false, 0},
    {"sealed-source", "alpha-gold", "", 24, 80, false, 0},
    {"no-plan", "-lead: [1, 2", "", 24, 80, false, 0},
    {"errors", "-plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uX}\n",
     "m", 24, 80, false, 0},
    {"errors-opened",
     "-plan: 1\nbeam: {particle: electron, kinetic_energy: 855 MeV, current: 20 uX}\n", "", 24, 80,
     false, 0},
    {"errors-later", "hydrogen-separation", "lbeam<Escape><Left>r", 24, 80, false, 0},
};

/* The folder of the sources, which tests are run in; another one while a screen is made. */
static char here[PATH_MAX];

static void put_plan(const char *demo)
{
    char path[PATH_MAX + 64];
    bh_text text = {0};
    bh_error err = {.code = BH_OK};
    snprintf(path, sizeof path, "%s/plans/%s.yaml", here, demo);
    if (demo[0] == '-')
        bh_text_append(&text, demo + 1);
    else
        ck_assert_msg(!bh_file_read(path, 1 << 20, &text, &err), "%s", err.text);
    ck_assert(!bh_file_write("plan.yaml", text.bytes, text.length, &err));
    bh_text_free(&text);
}

static bh_desk *open_desk(bool ascii)
{
    char materials[PATH_MAX + 16];
    snprintf(materials, sizeof materials, "%s/materials", here);
    const char *const folders[] = {materials, NULL};
    bh_error err = {.code = BH_OK};
    bh_desk *desk = bh_desk_open(
        &(bh_desk_start){.path = "plan.yaml", .folders = folders, .ascii = ascii}, &err);
    ck_assert_msg(desk != NULL, "%s", err.text);
    return desk;
}

static void enter_folder(char folder[64])
{
    snprintf(folder, 64, "/tmp/beamhours-shown-XXXXXX");
    ck_assert(getcwd(here, sizeof here) && mkdtemp(folder) && chdir(folder) == 0);
}

static void leave_folder(const char *folder)
{
    char command[128];
    snprintf(command, sizeof command, "rm -rf %s", folder);
    ck_assert_int_eq(chdir(here), 0);
    ck_assert_int_eq(system(command), 0);
}

/* Numbers have tests of their own, and change a little whenever physics gets better: here a digit
 * is a digit.  The files hold the digits as they were when they were written. */
static bool alike(const bh_text *a, const bh_text *b)
{
    if (a->length != b->length)
        return false;
    for (size_t i = 0; i < a->length; i++) {
        const char x = a->bytes[i], y = b->bytes[i];
        const bool digits = x >= '0' && x <= '9' && y >= '0' && y <= '9';
        if (x != y && !digits)
            return false;
    }
    return true;
}

static void compare(const char *name, const bh_text *got)
{
    char path[128];
    bh_text wanted = {0};
    bh_error err = {.code = BH_OK};
    snprintf(path, sizeof path, "docs/screens/%s.txt", name);
    const char *accept = getenv("ACCEPT");
    if (accept && accept[0])
        ck_assert_msg(!bh_file_write(path, got->bytes, got->length, &err), "%s", err.text);
    ck_assert_msg(!bh_file_read(path, 1 << 20, &wanted, &err), "%s; make screens", err.text);
    if (!alike(&wanted, got)) /* too long for a message of a test */
        fprintf(stderr, "%s is not as in %s (make screens; git diff):\n%s", name, path, got->bytes);
    ck_assert_msg(alike(&wanted, got), "%s is not as in %s (make screens; git diff)", name, path);
    bh_text_free(&wanted);
}

START_TEST(as_in_docs)
{
    char folder[64];
    bh_text got = {0};
    gsl_set_error_handler_off();
    enter_folder(folder);
    put_plan(screens[_i].demo);
    bh_desk *desk = open_desk(screens[_i].ascii);
    bh_desk_resize(desk, screens[_i].rows, screens[_i].columns);
    ck_assert(driven_settle(desk) && driven_press(desk, screens[_i].keys));
    driven_draw(desk, &got);
    const size_t evaluated = bh_desk_evaluated(desk);
    bh_desk_close(desk);
    leave_folder(folder);
    compare(screens[_i].name, &got);
    if (screens[_i].evaluated)
        ck_assert_uint_eq(evaluated, screens[_i].evaluated);
    bh_text_free(&got);
}
END_TEST

static const struct {
    const char *demo, *keys;
} additions[] = {
    {"alpha-gold", "llayers<Escape>a"},
    {"alpha-gold", "lsettings<Escape>a"},
    {"hydrogen-jet", "llayers<Escape>a"},
    {"hydrogen-jet", "lsettings<Escape>a"},
    {"hydrogen-separation", "llayers<Escape>a"},
    {"hydrogen-separation", "lsettings<Escape>a"},
    {"lead", "llayers<Escape>a"},
    {"lead", "lsettings<Escape>a"},
    {"muon-rings", "llayers<Escape>a"},
    {"muon-rings", "lsettings<Escape>a"},
    {"positron-electron", "llayers<Escape>a"},
    {"positron-electron", "lsettings<Escape>a"},
};

/* What is added leaves a valid plan valid, whatever that plan needs. */
START_TEST(added_is_valid)
{
    char folder[64];
    bh_text got = {0};
    gsl_set_error_handler_off();
    enter_folder(folder);
    put_plan(additions[_i].demo);
    bh_desk *desk = open_desk(false);
    bh_desk_resize(desk, 24, 120);
    ck_assert(driven_settle(desk) && driven_press(desk, additions[_i].keys));
    driven_draw(desk, &got);
    bh_desk_close(desk);
    leave_folder(folder);
    ck_assert_ptr_nonnull(strstr(got.bytes, "1 unsaved"));
    ck_assert_msg(!strstr(got.bytes, "errors") && !strstr(got.bytes, "ERROR"), "%s", got.bytes);
    bh_text_free(&got);
}
END_TEST

/* docs/screen.md lists each key with the words of the help. */
START_TEST(keys_are_documented)
{
    static const char *const where[] = {"", "plan", "table", "both"};
    bh_text page = {0};
    bh_error err = {.code = BH_OK};
    char row[160];
    size_t rows = 0, actions = 0;
    ck_assert_msg(!bh_file_read("docs/screen.md", 1 << 20, &page, &err), "%s", err.text);
    for (; bh_action_at(actions); actions++) {
        const bh_action *a = bh_action_at(actions);
        snprintf(row, sizeof row, "\n| `%s` | %s | %s |\n", a->key, where[a->where & 3], a->help);
        ck_assert_msg(strstr(page.bytes, row) != NULL, "no row in docs/screen.md:%s", row);
    }
    for (const char *at = page.bytes; (at = strstr(at, "\n| `")) != NULL; at++)
        rows++;
    ck_assert_uint_eq(rows, actions);
    bh_text_free(&page);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("shown");
    tcase_set_timeout(tests, 300);
    tcase_add_loop_test(tests, as_in_docs, 0, COUNT(screens));
    tcase_add_loop_test(tests, added_is_valid, 0, COUNT(additions));
    tcase_add_test(tests, keys_are_documented);
    return run_suite("screen/shown", tests);
}
