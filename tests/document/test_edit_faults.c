/* test_edit_faults.c - each request for memory fails once while a document is changed: the text is
 * as it was, and it is told. */
#include "../suite.h"

#include <stdio.h>

#include "../faults.h"

#include "beamhours/document/edit.h"

static const char text[] =
    "# c\na: 1\nn: |\n  x\n  y\ns:\n  - {name: K1, b: 2} # c\n  - {name: K2}\n"
    "  - angle: 1\nq: 'x'\ne:\nf: [1, 2]\n";

static const bh_edit_change changes[] = {
    {BH_EDIT_SET, "a", "b: c", 0, NULL},         {BH_EDIT_SET, "a", "[1, 2]", 0, NULL},
    {BH_EDIT_SET, "n", "z\n", 0, NULL},          {BH_EDIT_SET, "q", "y", 0, NULL},
    {BH_EDIT_SET, "e.x.y", "z", 0, NULL},        {BH_EDIT_SET, "new.x", "z", 0, NULL},
    {BH_EDIT_RENAME, "a", "b", 0, NULL},         {BH_EDIT_INSERT, "s", "{name: K3}", 0, NULL},
    {BH_EDIT_INSERT, "f", "3", 2, NULL},         {BH_EDIT_INSERT, "s.K1", "c: 3", 0, NULL},
    {BH_EDIT_DUPLICATE, "s.K1", "K1b", 0, NULL}, {BH_EDIT_DUPLICATE, "s.3", "K4", 0, NULL},
    {BH_EDIT_DUPLICATE, "a", "b", 0, NULL},      {BH_EDIT_REMOVE, "s.K2", NULL, 0, NULL},
    {BH_EDIT_MOVE, "s.K2", NULL, 1, NULL},
};

static bool ends_with_loss(const bh_diags *diags)
{
    const size_t count = bh_diags_count(diags);
    return count > 0 && strcmp(bh_diags_at(diags, count - 1)->text, "out of memory") == 0;
}

static bool unchanged(const bh_edit *edit)
{
    size_t length = 0;
    const char *bytes = bh_edit_bytes(edit, &length);
    return length == sizeof text - 1 && memcmp(bytes, text, length) == 0;
}

/* What fails: the change, its undoing, its redoing, opening, saving, asking. */
enum step { OPEN, CHANGE, UNDO, REDO, SAVE, ASK, STEPS };

static bool work(bh_edit *edit, enum step step, const bh_edit_change *change, bh_diags *diags)
{
    bh_text into = {0};
    bool done = false;
    switch (step) {
    case OPEN:
        edit = bh_edit_open(text, sizeof text - 1, "p.yaml", diags);
        done = edit != NULL;
        bh_edit_free(edit);
        return done;
    case CHANGE:
        return bh_edit_apply(edit, change, 1, diags);
    case UNDO:
        return bh_edit_undo(edit, diags);
    case REDO:
        return bh_edit_redo(edit, diags);
    case SAVE:
        done = bh_edit_saved(edit);
        if (!done)
            bh_diags_lose(diags);
        return done;
    default:
        done = bh_edit_allows(edit, BH_EDIT_DUPLICATE,
                              bh_node_get(bh_document_root(bh_edit_document(edit)), "a"), diags) &&
               bh_edit_try(edit, change, 1, &into, diags);
        bh_text_free(&into);
        return done;
    }
}

/* Lets one call fail; false when there are not so many. */
static bool fail_one(long call, enum step step, const bh_edit_change *change)
{
    bh_diags *diags = bh_diags_new(), *calm = bh_diags_new();
    bh_edit *edit = bh_edit_open(text, sizeof text - 1, "p.yaml", calm);
    bool before = true;
    if (step == UNDO || step == REDO)
        before = bh_edit_apply(edit, change, 1, calm);
    if (step == REDO)
        before = before && bh_edit_undo(edit, calm);
    ck_assert(before);
    fail_at(call, false);
    const bool done = work(edit, step, change, diags);
    const bool hit = fault_hit;
    fail_at(0, false);
    const bool lost = ends_with_loss(diags);
    ck_assert_msg(done || hit, "%s: nothing failed", change->path);
    ck_assert_msg(done || lost, "%s, step %d: call %ld failed unnoticed, or otherwise: %s",
                  change->path, (int)step, call,
                  bh_diags_count(diags) ? bh_diags_at(diags, 0)->text : "");
    const bool changes_text = step == CHANGE || step == REDO;
    if (step != UNDO)
        ck_assert_int_eq(unchanged(edit), !(changes_text && done));
    else
        ck_assert_int_eq(unchanged(edit), done);
    bh_edit_free(edit);
    bh_diags_free(calm);
    bh_diags_free(diags);
    return hit;
}

START_TEST(each_change_tells)
{
    for (int step = OPEN; step < STEPS; step++) {
        long call = 1;
        while (fail_one(call, (enum step)step, &changes[_i]))
            call++;
        ck_assert_int_gt(call, 1);
    }
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("edit faults");
    tcase_set_timeout(tests, 60);
    tcase_add_loop_test(tests, each_change_tells, 0, COUNT(changes));
    return run_suite("document/edit faults", tests);
}
