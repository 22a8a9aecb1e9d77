/* test_terminal.c - the real program in a pseudo-terminal: what a user sees, cell by cell. */
#include "../suite.h"

#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#include "beamhours/base/text.h"
#include "tty.h"

static void begin_with(tty *t, const tty_start *how)
{
    tty_folder(t, "hydrogen-separation");
    tty_run(t, how);
    tty_wait(t, "asked");
    tty_wait_gone(t, "computing");
}

static void begin(tty *t)
{
    begin_with(t, &(tty_start){.arguments = {"plan.yaml"}});
}

/* A row with one byte a column. */
static void plain_row(const tty *t, int row, char out[256])
{
    for (int c = 0; c < t->columns; c++) {
        const uint32_t point = tty_cell(t, row, c).chars[0];
        out[c] = point == 0 ? ' ' : point < 0x7F ? (char)point : '?';
    }
    out[t->columns] = '\0';
}

/* The cell of the run table below a heading, in the row of a setting; empty where it is not there
 * (yet: what the program sends may come in pieces). */
static void read_cell(const tty *t, const char *name, const char *heading, char out[32])
{
    char text[256], row_name[64];
    plain_row(t, 2, text);
    const char *head = strstr(text, heading);
    const int last = head ? (int)(head - text) + (int)strlen(heading) - 1 : 0;
    out[0] = '\0';
    snprintf(row_name, sizeof row_name, "%s ", name);
    for (int r = 4; head && r < t->rows - 3; r++) {
        plain_row(t, r, text);
        const char *at = strstr(text + 28, row_name);
        if (!at || at > text + 32)
            continue;
        int first = last;
        while (first > 0 && text[first] != ' ')
            first--;
        snprintf(out, 32, "%.*s", last - first, text + first + 1);
        return;
    }
}

static bool is_known(tty *t, const char *name, const char *heading, char out[32])
{
    read_cell(t, name, heading, out);
    return out[0] && out[0] != '?'; /* ?: not computed yet */
}

static void cell_of(tty *t, const char *name, const char *heading, char out[32])
{
    tty_until(t, is_known(t, name, heading, out));
}

static bool has_cell(tty *t, const char *name, const char *heading, const char *wanted)
{
    char got[32];
    read_cell(t, name, heading, got);
    return strcmp(got, wanted) == 0;
}

static void wait_cell(tty *t, const char *name, const char *heading, const char *wanted)
{
    tty_until(t, has_cell(t, name, heading, wanted));
}

/* To a line of the plan by a word in it. */
static void look_for(tty *t, const char *word)
{
    tty_type(t, "<Home>l");
    tty_wait(t, "look for");
    tty_type(t, word);
    tty_wait(t, word);
    tty_type(t, "<Escape>");
    tty_wait_gone(t, "look for");
}

static void leave(tty *t)
{
    tty_type(t, "q");
    ck_assert_int_eq(tty_wait_end(t), 0);
    tty_end(t);
}

static void leave_unsaved(tty *t)
{
    tty_type(t, "q");
    tty_wait(t, "leave without saving");
    tty_type(t, "w");
    ck_assert_int_eq(tty_wait_end(t), 0);
    tty_end(t);
}

static void file_has(const tty *t, const char *text)
{
    char *all = tty_read(t, "plan.yaml");
    ck_assert_msg(strstr(all, text) != NULL, "no \"%s\" in\n%s", text, all);
    free(all);
}

static void save(tty *t)
{
    tty_type(t, "s");
    tty_wait(t, "saved in plan.yaml");
}

START_TEST(edits_live_and_saves)
{
    tty t;
    begin(&t);
    tty_wait_row(&t, 0, "plan.yaml   electron 900 MeV to 2.6 GeV, 2 uA to 10 uA on 9 cm");
    char before[32], hours[32];
    cell_of(&t, "low-1", "hours", before);
    look_for(&t, "current");
    tty_type(&t, "4 uA");
    tty_wait(&t, "PROVISIONAL");
    wait_cell(&t, "low-1", "was", before); /* what it was, beside what it becomes */
    cell_of(&t, "low-1", "hours", hours);
    ck_assert_str_ne(hours, before);
    ck_assert_double_lt(atof(hours), 0.7 * atof(before));
    tty_type(&t, "<Enter>");
    tty_wait_gone(&t, "PROVISIONAL");
    tty_wait_row(&t, 0, "1 unsaved");
    save(&t);
    tty_wait_row(&t, 0, "saved");
    file_has(&t, "  current: 4 uA\n");
    leave(&t);
}
END_TEST

START_TEST(says_what_is_wrong)
{
    tty t;
    begin(&t);
    look_for(&t, "current");
    tty_type(&t, "30 uX");
    tty_wait(&t, "NOT YET");
    tty_wait(&t, "in uA"); /* units that would do */
    tty_type(&t, "<Enter>");
    tty_wait(&t, "NOT YET");
    tty_type(&t, "<Rubout>A");
    tty_wait(&t, "PROVISIONAL");
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "PROVISIONAL");
    tty_wait_row(&t, 0, "2 uA");
    leave(&t);
}
END_TEST

START_TEST(takes_back_and_does_again)
{
    tty t;
    begin(&t);
    look_for(&t, "current");
    tty_type(&t, "4 uA<Enter>");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_type(&t, "5 uA<Enter>");
    tty_wait_row(&t, 0, "2 unsaved");
    tty_type(&t, "b");
    tty_wait(&t, "taken back: beam.current: 4 uA -> 5 uA");
    tty_wait_row(&t, 0, "4 uA");
    tty_type(&t, "b");
    tty_wait(&t, "taken back: beam.current: 2 uA -> 4 uA");
    tty_wait_row(&t, 0, "saved"); /* it is as the file has it */
    tty_type(&t, "b");
    tty_wait(&t, "nothing is left to take back");
    tty_type(&t, "ff");
    tty_wait(&t, "done again: beam.current: 4 uA -> 5 uA");
    save(&t);
    file_has(&t, "  current: 5 uA\n");
    leave(&t);
}
END_TEST

START_TEST(changes_lists)
{
    tty t;
    begin(&t);
    look_for(&t, "low-2");
    tty_type(&t, "d");
    tty_wait(&t, "low-4");
    tty_wait(&t, " low-4 ");
    tty_type(&t, "<<");
    tty_wait_row(&t, 0, "2 unsaved");
    look_for(&t, "low-3");
    tty_type(&t, "<Left><Left>r");
    tty_wait(&t, "removed");
    tty_wait_gone(&t, "low-3");
    look_for(&t, "layers");
    tty_type(&t, "a");
    tty_wait_row(&t, 0, "4 unsaved");
    save(&t);
    file_has(&t, "    - {material: aluminium, thickness: 0.1 mm, role: window}\n"
                 "    - {material: aluminium, thickness: 0.1 mm, role: window}\n  wall:");
    file_has(&t, "  - {name: low-1, q2: 0.55 GeV2}\n"
                 "  - {name: low-4, q2: 0.55 GeV2, beam: {kinetic_energy: 1300 MeV}}\n"
                 "  - {name: low-2, q2: 0.55 GeV2, beam: {kinetic_energy: 1300 MeV}}\n"
                 "  - {name: high-1,");
    leave(&t);
}
END_TEST

/* Keys with names of their own: F1 is the help, the others are told to mean nothing. */
START_TEST(function_keys)
{
    tty t;
    tty_folder(&t, "hydrogen-separation");
    tty_run(&t, &(tty_start){.arguments = {"plan.yaml"}});
    tty_wait(&t, "asked");
    tty_type(&t, "<F5>");
    tty_wait(&t, "F5 is no key here; ? shows all keys");
    tty_type(&t, "<Insert>");
    tty_wait(&t, "Insert is no key here; ? shows all keys");
    tty_type(&t, "<F1>");
    tty_wait(&t, "In every part");
    tty_type(&t, "<F12>"); /* any other key closes it */
    tty_wait_gone(&t, "In every part");
    tty_type(&t, "lcurrent<Escape>4<F1>"); /* the value stays what it is */
    tty_wait(&t, "F1 is no key here");
    ck_assert(!tty_shows(&t, "? shows all keys"));
    tty_type(&t, " uA");
    tty_wait(&t, "Enter keeps it");
    tty_type(&t, "<Enter>");
    tty_wait_row(&t, 0, "4 uA");
    tty_type(&t, "q<F5>");
    tty_wait(&t, "not saved in");
    tty_type(&t, "w");
    ck_assert_int_eq(tty_wait_end(&t), 0);
    tty_end(&t);
}
END_TEST

START_TEST(orders_and_pins)
{
    tty t;
    char before[32], hours[32];
    begin(&t);
    cell_of(&t, "low-1", "hours", before);
    tty_type(&t, "<Tab><Right><Right><Right>oo");
    tty_wait(&t, "rows by sigma, falling");
    tty_wait_row(&t, 4, "low-3");
    tty_type(&t, "p");
    tty_wait(&t, "against the pin");
    tty_type(&t, "<Tab>");
    look_for(&t, "current");
    tty_type(&t, "4 uA<Enter>");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_wait_gone(&t, before);
    tty_type(&t, "<Tab><Right><Right>"); /* hours */
    wait_cell(&t, "low-1", "pin", before);
    cell_of(&t, "low-1", "hours", hours);
    ck_assert_double_lt(atof(hours), 0.7 * atof(before));
    tty_type(&t, "p");
    tty_wait(&t, "the pin is off");
    tty_type(&t, "o");
    tty_wait(&t, "rows by hours, rising");
    leave_unsaved(&t);
}
END_TEST

START_TEST(chooses)
{
    tty t;
    begin(&t);
    look_for(&t, "particle");
    tty_type(&t, "<Enter>");
    tty_wait(&t, "CHOOSE particle");
    tty_type(&t, "posi");
    tty_wait_row(&t, 0, "positron");
    tty_wait(&t, "PROVISIONAL");
    tty_type(&t, "<Enter>");
    tty_wait_gone(&t, "CHOOSE");
    tty_wait_row(&t, 0, "1 unsaved");
    look_for(&t, "material");
    tty_type(&t, "<Enter>");
    tty_wait(&t, "CHOOSE material");
    tty_wait(&t, "g/cm3"); /* what it is */
    tty_type(&t, "kapt<Enter>");
    tty_wait_row(&t, 0, "2 unsaved");
    look_for(&t, "beam");
    tty_type(&t, "a");
    tty_wait(&t, "ADD A KEY");
    tty_type(&t, "duty<Enter>");
    tty_wait(&t, "beam.duty_factor");
    tty_type(&t, "<Enter>");
    tty_wait_row(&t, 0, "3 unsaved");
    save(&t);
    file_has(&t, "particle: positron\n");
    file_has(&t, "{material: kapton, thickness: 0.1 mm, role: window}");
    file_has(&t, "duty_factor: ");
    leave(&t);
}
END_TEST

START_TEST(explains_and_shows)
{
    tty t;
    begin(&t);
    tty_type(&t, "?");
    tty_wait(&t, "ALL KEYS");
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "ALL KEYS");
    tty_type(&t, "c");
    tty_wait(&t, "radiation-protection group");
    tty_type(&t, "<Escape>m");
    tty_wait(&t, "MESSAGES");
    tty_type(&t, "<Escape><Tab>e");
    tty_wait(&t, "Inputs");
    tty_type(&t, "<PageDown><PageDown>");
    tty_wait(&t, "37 to");
    tty_type(&t, "<Escape>v");
    tty_wait(&t, "signal rate [Hz] against angle");
    tty_type(&t, "<Down><Enter>");
    tty_wait(&t, "bin 4");
    tty_type(&t, "<Enter>");
    tty_wait_gone(&t, "bin 4");
    tty_type(&t, "t");
    tty_wait(&t, "> 2");
    leave(&t);
}
END_TEST

START_TEST(resizes)
{
    tty t;
    begin(&t);
    look_for(&t, "current");
    tty_type(&t, "4 u");
    tty_wait(&t, "NOT YET");
    tty_size(&t, 60, 200);
    tty_wait_row(&t, 59, "Enter keep");
    tty_type(&t, "A");
    tty_wait(&t, "PROVISIONAL");
    tty_size(&t, 10, 40);
    tty_wait_row(&t, 9, "Enter keep");
    tty_size(&t, 24, 80);
    tty_wait_row(&t, 23, "Enter keep");
    tty_wait(&t, "[4 uA     ]");
    tty_type(&t, "<Enter>");
    tty_wait_row(&t, 0, "1 unsaved");
    for (int i = 0; i < 20; i++)
        tty_size(&t, 10 + i, 40 + 5 * i);
    tty_wait_row(&t, 28, "? help");
    leave_unsaved(&t);
}
END_TEST

START_TEST(plain_letters)
{
    tty t;
    begin_with(&t, &(tty_start){.locale = "C", .arguments = {"plan.yaml"}});
    look_for(&t, "in_plane");
    tty_wait(&t, "+-20 mrad");
    for (int r = 0; r < t.rows; r++)
        for (const char *c = tty_row(&t, r); *c; c++)
            ck_assert_int_lt((unsigned char)*c, 0x80);
    leave(&t);
}
END_TEST

/* Has any cell another colour than a plain one? */
static bool coloured(const tty *t)
{
    const VTermScreenCell plain = tty_cell(t, 3, 1);
    for (int r = 0; r < t->rows; r++)
        for (int c = 0; c < t->columns; c++) {
            const VTermScreenCell cell = tty_cell(t, r, c);
            if (cell.chars[0] && !vterm_color_is_equal(&cell.fg, &plain.fg))
                return true;
        }
    return false;
}

/* The focus is to be seen without colour. */
static bool reversed(const tty *t, const char *text)
{
    const int row = tty_find_row(t, text);
    for (int c = 0; row >= 0 && c < t->columns; c++)
        if (tty_cell(t, row, c).attrs.reverse)
            return true;
    return false;
}

START_TEST(no_colours)
{
    tty t;
    begin(&t);
    tty_until(&t, coloured(&t) && reversed(&t, ">plan"));
    leave(&t);
    begin_with(&t, &(tty_start){.environment = "NO_COLOR=1", .arguments = {"plan.yaml"}});
    tty_until(&t, reversed(&t, ">plan"));
    ck_assert(!coloured(&t));
    leave(&t);
    begin_with(&t, &(tty_start){.term = "vt100", .arguments = {"plan.yaml"}});
    tty_until(&t, reversed(&t, ">plan"));
    ck_assert(!coloured(&t));
    leave(&t);
}
END_TEST

START_TEST(mouse)
{
    tty t;
    begin(&t);
    tty_type(&t, "<Click 8,20>");
    tty_wait(&t, "> current");
    tty_type(&t, "<WheelDown 8,20>");
    tty_wait(&t, "> name");
    tty_type(&t, "<Click 5,45>");
    tty_wait(&t, ">low-2");
    tty_type(&t, "<Click 2,55>"); /* a heading */
    tty_wait(&t, "rows by sigma, rising");
    tty_type(&t, "<Click 22,60>"); /* cautions */
    tty_wait(&t, "CAUTIONS");
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "CAUTIONS");
    tty_type(&t, "<Click 23,76>"); /* ? help */
    tty_wait(&t, "ALL KEYS");
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "ALL KEYS");
    leave(&t);
}
END_TEST

/* A button that is let go of, and others than the first, mean nothing: news come all the same. */
START_TEST(other_mouse_events)
{
    static const char *const events[] = {"\033[<0;21;9m",  "\033[<1;21;9M",   "\033[<1;21;9m",
                                         "\033[<2;21;9M",  "\033[<2;21;9m",   "\033[<66;21;9M",
                                         "\033[<67;21;9M", "\033[<128;21;9M", "\033[<128;21;9m"};
    tty t;
    begin(&t);
    tty_send(&t, "\033[<0;21;9M");
    tty_wait(&t, "> current");
    for (int i = 0; i < COUNT(events); i++) {
        tty_send(&t, events[i]);
        tty_pump(&t, 50);
        tty_size(&t, 25 + i, 90); /* is seen without a key */
        tty_wait_row(&t, 24 + i, "? help");
        ck_assert_msg(tty_shows(&t, "> current        2 uA"), "%s", events[i]);
    }
    leave(&t);
}
END_TEST

START_TEST(what_it_would_take)
{
    tty t;
    begin(&t);
    tty_type(&t, "<Tab>w");
    tty_wait(&t, "WHAT WOULD IT TAKE");
    tty_type(&t, "0.3 h<Down><Right>");
    tty_wait(&t, "< current >");
    tty_wait(&t, "Enter takes it");
    tty_wait(&t, "0.3000 ");
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "WHAT WOULD");
    tty_wait_row(&t, 0, "saved");
    tty_type(&t, "0.5");
    tty_wait(&t, "Enter takes it");
    tty_type(&t, "<Enter>");
    tty_wait(&t, "taken: settings.low-1.");
    tty_wait_row(&t, 0, "1 unsaved");
    leave_unsaved(&t);
}
END_TEST

/* A text under | gains a line and loses one; all the rest is as it was. */
START_TEST(texts_have_lines)
{
    tty t;
    begin(&t);
    char *before = tty_read(&t, "plan.yaml");
    look_for(&t, "notes");
    tty_type(&t, "<Enter>");
    tty_wait(&t, "TEXT notes");
    tty_wait(&t, "Tab new line");
    tty_type(&t, "<Tab>Bring a spare cell.");
    tty_wait(&t, "Bring a spare cell.");
    tty_type(&t, "<Enter>");
    tty_wait_gone(&t, "TEXT notes");
    tty_wait_row(&t, 0, "1 unsaved");
    save(&t);
    file_has(&t, "polarisation varies.\n  Bring a spare cell.\n\nbeam:");
    tty_type(&t, "<Enter>");
    tty_wait(&t, "Bring a spare cell.");
    for (int i = 0; i < 20; i++)
        tty_type(&t, "<Rubout>");
    tty_type(&t, "<Enter>");
    tty_wait_gone(&t, "TEXT notes");
    save(&t);
    char *after = tty_read(&t, "plan.yaml");
    ck_assert_str_eq(before, after);
    free(before);
    free(after);
    leave(&t);
}
END_TEST

/* What is pasted commands nothing: lines of it are no keys, wherever the focus is. */
START_TEST(pastes)
{
    tty t;
    begin(&t);
    tty_paste(&t, "rdq\rs\r");
    tty_wait(&t, "what is pasted is text for a value");
    look_for(&t, "current");
    tty_type(&t, "<Enter><Rubout><Rubout><Rubout><Rubout>");
    tty_paste(&t, "4\ruA\r");
    tty_wait(&t, "PROVISIONAL");
    tty_type(&t, "<Enter>");
    tty_wait_row(&t, 0, "1 unsaved");
    look_for(&t, "notes");
    tty_type(&t, "<Enter><Tab>");
    tty_paste(&t, "one\rtwo\tthree\r");
    tty_wait(&t, "two three");
    tty_type(&t, "<Enter>");
    tty_wait_gone(&t, "TEXT notes");
    save(&t);
    file_has(&t, "current: 4 uA\n");
    file_has(&t, "varies.\n  one\n  two three\n\nbeam:");
    tty_type(&t, "<Enter>");
    bh_text much = {0};
    for (int i = 0; i < 20000; i++)
        bh_text_append(&much, "word ");
    tty_paste(&t, much.bytes); /* more than fits */
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "TEXT notes");
    bh_text_free(&much);
    leave(&t);
}
END_TEST

/* The marks around what is pasted come in pieces, as on a slow line, or the last one not at all. */
START_TEST(pastes_in_pieces)
{
    tty t;
    begin(&t);
    look_for(&t, "current");
    tty_type(&t, "<Enter><Rubout><Rubout><Rubout><Rubout>");
    tty_wait(&t, "[  ");
    tty_send(&t, "\033[200~4 u");
    tty_wait(&t, "[4 u ");
    tty_send(&t, "A\033[2");
    tty_wait(&t, "[4 uA ");
    tty_pump(&t, 100); /* or the mark might come in one piece */
    tty_type(&t, "01~<Enter>");
    tty_wait_row(&t, 0, "1 unsaved");
    tty_type(&t, "<Enter><Rubout><Rubout><Rubout><Rubout>");
    tty_wait(&t, "[  ");
    tty_send(&t, "\033[200~5 uA\rq");
    tty_wait(&t, "[5 uA q ");
    tty_wait(&t, "unknown unit 'q'"); /* it is tried out, and keys are keys again */
    tty_type(&t, "<Rubout><Rubout><Enter>");
    tty_wait_row(&t, 0, "2 unsaved");
    save(&t);
    file_has(&t, "current: 5 uA\n");
    leave(&t);
}
END_TEST

/* What waits to be read while the program is busy for long is still pasted. */
START_TEST(pastes_to_a_busy_program)
{
    tty t;
    const struct timespec busy = {2, 200000000};
    begin(&t);
    look_for(&t, "current");
    tty_type(&t, "<Enter><Rubout><Rubout><Rubout><Rubout>");
    tty_send(&t, "\033[200~4 u");
    tty_wait(&t, "[4 u ");
    ck_assert_int_eq(kill(t.child, SIGSTOP), 0);
    tty_type(&t, "A\rqw");
    nanosleep(&busy, NULL);
    ck_assert_int_eq(kill(t.child, SIGCONT), 0);
    tty_wait(&t, "[4 uA qw ");
    tty_send(&t, "\033[201~");
    tty_type(&t, "<Escape>");
    tty_wait_gone(&t, "[4 uA");
    leave(&t);
}
END_TEST

START_TEST(begins_without_a_plan)
{
    tty t;
    tty_folder(&t, NULL);
    tty_run(&t, &(tty_start){.rows = 24});
    tty_wait(&t, "BEGIN WITH A PLAN");
    tty_wait(&t, "hydrogen-separation");
    tty_type(&t, "my-plan<Enter>");
    tty_wait(&t, "scan.3");
    tty_wait_row(&t, 0, "new");
    tty_type(&t, "s");
    tty_wait(&t, "saved in my-plan.yaml");
    ck_assert(tty_exists(&t, "my-plan.yaml"));
    leave(&t);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("terminal");
    tcase_set_timeout(tests, tty_limit());
    tcase_add_test(tests, edits_live_and_saves);
    tcase_add_test(tests, says_what_is_wrong);
    tcase_add_test(tests, takes_back_and_does_again);
    tcase_add_test(tests, changes_lists);
    tcase_add_test(tests, function_keys);
    tcase_add_test(tests, orders_and_pins);
    tcase_add_test(tests, chooses);
    tcase_add_test(tests, explains_and_shows);
    tcase_add_test(tests, resizes);
    tcase_add_test(tests, plain_letters);
    tcase_add_test(tests, no_colours);
    tcase_add_test(tests, mouse);
    tcase_add_test(tests, other_mouse_events);
    tcase_add_test(tests, what_it_would_take);
    tcase_add_test(tests, texts_have_lines);
    tcase_add_test(tests, pastes);
    tcase_add_test(tests, pastes_in_pieces);
    tcase_add_test(tests, pastes_to_a_busy_program);
    tcase_add_test(tests, begins_without_a_plan);
    return run_suite("terminal", tests);
}
