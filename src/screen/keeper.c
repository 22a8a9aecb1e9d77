/* keeper.c - the user's file is theirs: nothing of it, and nothing of their work, gets lost. */
#include "beamhours/screen/keeper.h"

#include <errno.h>
#include <stdio.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

static const double write_after = 1.0, look_after = 1.0, again_after = 5.0; /* s */

static void set_path(bh_keeper *keeper, const char *path)
{
    (void)snprintf(keeper->path, sizeof keeper->path, "%.*s", (int)sizeof keeper->path - 1, path);
    keeper->passed = 0;
    keeper->pending = -1;
}

static void drop_rescue(bh_keeper *keeper)
{
    if (keeper->rescue)
        (void)!bh_rescue_discard(keeper->rescue, NULL);
    keeper->pending = -1;
}

bh_code bh_keeper_open(bh_keeper *keeper, const char *path, bh_text *into, bh_error *err)
{
    struct stat file;
    if (stat(path, &file) == 0 && !S_ISREG(file.st_mode) && !S_ISDIR(file.st_mode)) {
        (void)bh_fail(err, BH_EIO, "is a pipe or a device: nothing could be saved in it");
        return bh_fail_at(err, BH_EIO, (bh_mark){.file = path});
    }
    set_path(keeper, path);
    return bh_stamp_read(path, BH_DOCUMENT_LIMIT, into, &keeper->stamp, err);
}

void bh_keeper_begin(bh_keeper *keeper, const char *name)
{
    char path[300];
    (void)snprintf(path, sizeof path, "%.200s.yaml", name);
    for (int i = 2; access(path, F_OK) == 0 && i < 1000; i++)
        (void)snprintf(path, sizeof path, "%.200s-%d.yaml", name, i);
    set_path(keeper, path);
    keeper->stamp = (bh_stamp){.there = false};
}

void bh_keeper_close(bh_keeper *keeper, bool drop)
{
    bh_keeper_leave_offer(keeper);
    if (keeper->rescue && drop)
        (void)!bh_rescue_discard(keeper->rescue, NULL);
    else if (keeper->rescue)
        (void)bh_rescue_write(keeper->rescue);
    bh_rescue_free(keeper->rescue);
    bh_presence_close(keeper->mark);
    keeper->rescue = NULL;
    keeper->mark = NULL;
}

/* --- saving --- */

static void ask_changed(bh_model *model, bool gone)
{
    (void)snprintf(model->question_text[0], sizeof *model->question_text,
                   gone ? "The file is not there any more."
                        : "The file changed on disk since it was read.");
    (void)snprintf(model->question_text[1], sizeof *model->question_text,
                   "Nothing is lost yet: your work is kept here.");
    model->question_text[2][0] = '\0';
    bh_ask(model, gone ? BH_QUESTION_GONE : BH_QUESTION_CHANGED);
}

/* `why` says of the file what would do. */
static void not_saved(bh_model *model, const char *path, const char *why)
{
    const char *slash = strrchr(path, '/');
    bh_model_note(model, true, "NOT SAVED  %.80s: %.150s", slash ? slash + 1 : path, why);
}

static bool say_save(bh_keeper *keeper, bh_model *model, bh_save_state state, const bh_error *err)
{
    switch (state) {
    case BH_SAVE_DONE:
        bh_model_saved(model);
        drop_rescue(keeper);
        bh_model_note(model, false, "saved in %.200s", keeper->path);
        return true;
    case BH_SAVE_CHANGED:
    case BH_SAVE_GONE:
        ask_changed(model, state == BH_SAVE_GONE);
        return false;
    default:
        not_saved(model, keeper->path, err->text);
        return false;
    }
}

bool bh_keeper_save(bh_keeper *keeper, bh_model *model, bool over)
{
    size_t length = 0;
    bh_error err = {.code = BH_OK};
    const char *bytes = bh_model_bytes(model, &length);
    if (over && bh_stamp_accept(keeper->path, &keeper->stamp, &err)) {
        not_saved(model, keeper->path, err.text);
        return false;
    }
    const bh_save_state state = bh_stamp_save(keeper->path, bytes, length, &keeper->stamp, &err);
    return say_save(keeper, model, state, &err);
}

bool bh_keeper_save_as(bh_keeper *keeper, bh_model *model)
{
    const char *path = model->field.bytes;
    if (strcmp(path, keeper->path) == 0)
        return bh_keeper_save(keeper, model, false);
    if (access(path, F_OK) == 0) {
        not_saved(model, path, "exists; choose another name");
        return false;
    }
    bh_error err = {.code = BH_OK};
    bh_stamp stamp = {.there = false};
    size_t length = 0;
    const char *bytes = bh_model_bytes(model, &length);
    const bh_save_state state = bh_stamp_save(path, bytes, length, &stamp, &err);
    if (state != BH_SAVE_DONE) {
        not_saved(model, path, err.text);
        return false;
    }
    bh_keeper_close(keeper, true);
    set_path(keeper, path);
    keeper->stamp = stamp;
    (void)snprintf(model->file, sizeof model->file, "%.*s", (int)sizeof model->file - 1, path);
    (void)bh_keeper_others(keeper, model);
    return say_save(keeper, model, BH_SAVE_DONE, &err);
}

bool bh_keeper_read(bh_keeper *keeper, bh_model *model, bh_text *into)
{
    bh_error err = {.code = BH_OK};
    if (!bh_stamp_read(keeper->path, BH_DOCUMENT_LIMIT, into, &keeper->stamp, &err)) {
        drop_rescue(keeper);
        return true;
    }
    bh_model_note(model, true, "the file cannot be read: %.180s", err.text);
    return false;
}

/* --- unsaved work --- */

void bh_keeper_tell(bh_keeper *keeper, bh_model *model, double now)
{
    size_t length = 0;
    if (!model->edit || !keeper->rescue || bh_edit_version(model->edit) == keeper->version)
        return;
    const char *bytes = bh_edit_bytes(model->edit, &length);
    keeper->version = bh_edit_version(model->edit);
    if (bh_model_unsaved(model) == 0) {
        drop_rescue(keeper);
        return;
    }
    if (bh_rescue_prepare(keeper->rescue, bytes, length, keeper->stamp.hash) && keeper->pending < 0)
        keeper->pending = now;
}

bool bh_keeper_write(bh_keeper *keeper, bh_model *model)
{
    const bool good = bh_rescue_write(keeper->rescue);
    if (!good && !keeper->warned)
        bh_model_note(model, true,
                      "unsaved work cannot be kept beside the plan (%s): save often, or n saves it "
                      "elsewhere",
                      strerror(errno)); /* NOLINT(concurrency-mt-unsafe): this thread alone */
    if (good && keeper->warned)
        bh_model_note(model, false, "unsaved work can be kept beside the plan again");
    keeper->warned = !good;
    if (good)
        keeper->pending = -1;
    return good;
}

double bh_keeper_tend(bh_keeper *keeper, bh_model *model, double now)
{
    if (!model->edit || !keeper->rescue)
        return -1;
    bh_keeper_tell(keeper, model, now);
    if (keeper->pending < 0)
        return -1;
    const double left = keeper->pending + write_after - now;
    if (left > 0)
        return left;
    if (bh_keeper_write(keeper, model))
        return -1;
    keeper->pending = now + again_after - write_after;
    return again_after;
}

bool bh_keeper_look(bh_keeper *keeper, bh_model *model, double now)
{
    if (model->over != BH_OVER_NOTHING || now - keeper->looked < look_after || !keeper->stamp.there)
        return false;
    keeper->looked = now;
    const bh_file_state state = bh_stamp_check(keeper->path, &keeper->stamp);
    if (state != BH_FILE_CHANGED && state != BH_FILE_GONE)
        return false;
    if (keeper->asked)
        return false;
    keeper->asked = true; /* once; saving asks again */
    ask_changed(model, state == BH_FILE_GONE);
    return true;
}
