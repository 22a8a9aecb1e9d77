/* rescue.c - unsaved work beside the file it belongs to. */
#include "beamhours/base/rescue.h"

#include <ctype.h>
#include <errno.h>
#include <fcntl.h>
#include <inttypes.h>
#include <signal.h>
#include <stdatomic.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#include "beamhours/base/beside.h"
#include "beamhours/base/file.h"
#include "beamhours/base/stamp.h"

enum { LIMIT = 64 * 1024 * 1024, NAMES = 2 };

#define LAST_LINE_BEGINS "\n# beamhours: unsaved work, "

/* Made ready to be written, and never changed after that. */
struct ready {
    char *bytes;
    size_t length; /* [bytes] with its last line */
    size_t number; /* counted from 1 */
    struct ready *before;
};

struct bh_rescue {
    char *path, *folder;
    char *fresh[NAMES]; /* where it is written; the second where a signal comes in between */
    _Atomic(struct ready *) now;
    size_t count;   /* how many were made ready */
    size_t latest;  /* the number of the one to be rescued; 0: none */
    size_t written; /* the number of the one in the file; 0: none of ours */
    volatile sig_atomic_t busy;
};

static void free_ready(struct ready *ready)
{
    while (ready) {
        struct ready *before = ready->before;
        free(ready->bytes);
        free(ready);
        ready = before;
    }
}

/* --- one for a file --- */

static bool name_all(bh_rescue *r, const char *real, int number)
{
    const char *tails[NAMES] = {"~", "~~"};
    const size_t folder = bh_folder_length(real);
    r->path = bh_beside_session(real, ".unsaved", number, "");
    for (int i = 0; i < NAMES; i++)
        r->fresh[i] = bh_beside_session(real, ".unsaved", number, tails[i]);
    r->folder = malloc(folder + 2);
    if (!r->path || !r->fresh[0] || !r->fresh[1] || !r->folder)
        return false;
    (void)snprintf(r->folder, folder + 2, "%.*s", (int)(folder ? folder : 1), folder ? real : ".");
    return true;
}

bh_rescue *bh_rescue_new(const char *path, int number)
{
    char *real = bh_real_path(path);
    bh_rescue *r = calloc(1, sizeof *r);
    const bool good = real && r && name_all(r, real, number);
    free(real);
    if (good)
        return r;
    bh_rescue_free(r);
    return NULL;
}

void bh_rescue_free(bh_rescue *rescue)
{
    if (!rescue)
        return;
    free_ready(atomic_load(&rescue->now));
    for (int i = 0; i < NAMES; i++)
        free(rescue->fresh[i]);
    free(rescue->path);
    free(rescue->folder);
    free(rescue);
}

const char *bh_rescue_path(const bh_rescue *rescue)
{
    return rescue->path;
}

/* --- making ready --- */

/* What was ready before stays until the one after the next, for a handler in another thread. */
static void exchange(bh_rescue *rescue, struct ready *next)
{
    struct ready *last = atomic_load(&rescue->now);
    next->before = last;
    next->number = ++rescue->count;
    atomic_store(&rescue->now, next);
    rescue->latest = next->number;
    if (last) {
        free_ready(last->before);
        last->before = NULL;
    }
}

static struct ready *make_ready(bh_text *content)
{
    struct ready *next = content->failed ? NULL : calloc(1, sizeof *next);
    if (!next) {
        bh_text_free(content);
        return NULL;
    }
    next->length = content->length;
    next->bytes = bh_text_take(content);
    return next;
}

bool bh_rescue_prepare(bh_rescue *rescue, const char *bytes, size_t length, uint64_t base)
{
    bh_text content = {0};
    bh_text_append_bytes(&content, bytes, length);
    bh_text_appendf(&content, "%s%zu bytes, %016" PRIx64 ", begun from %016" PRIx64 "\n",
                    LAST_LINE_BEGINS, length, bh_stamp_hash(bytes, length), base);
    struct ready *next = make_ready(&content);
    if (next)
        exchange(rescue, next);
    return next != NULL;
}

void bh_rescue_clear(bh_rescue *rescue)
{
    struct ready *last = atomic_load(&rescue->now);
    atomic_store(&rescue->now, NULL);
    rescue->latest = 0;
    free_ready(last);
}

/* --- writing: only what a signal handler may call --- */

static bool write_fresh(const char *name, const struct ready *ready)
{
    (void)unlink(name); /* of a session that was killed just here */
    const int fd = open(name, O_WRONLY | O_CREAT | O_EXCL | O_CLOEXEC, 0600);
    if (fd < 0)
        return false;
    bool good = bh_write_all(fd, ready->bytes, ready->length) && fsync(fd) == 0;
    const int why = errno;
    if (close(fd) != 0)
        good = false;
    else
        errno = why;
    return good;
}

static void sync_folder(const char *folder)
{
    const int fd = open(folder, O_RDONLY | O_CLOEXEC);
    if (fd >= 0) {
        (void)fsync(fd); /* a file system that cannot is no reason to complain */
        (void)close(fd);
    }
}

bool bh_rescue_write(bh_rescue *rescue)
{
    struct ready *ready = atomic_load(&rescue->now);
    if (!ready || ready->number == rescue->written)
        return true;
    const char *name = rescue->fresh[rescue->busy ? 1 : 0];
    rescue->busy++;
    const bool good = write_fresh(name, ready) && rename(name, rescue->path) == 0;
    const int why = errno;
    if (good) {
        rescue->written = ready->number;
        sync_folder(rescue->folder);
    } else {
        (void)unlink(name);
    }
    rescue->busy--;
    errno = why;
    return good;
}

bool bh_rescue_pending(const bh_rescue *rescue)
{
    return rescue->latest > 0 && rescue->latest != rescue->written;
}

bh_code bh_rescue_discard(bh_rescue *rescue, bh_error *err)
{
    char why[128];
    bh_rescue_clear(rescue);
    if (unlink(rescue->path) == 0 || errno == ENOENT)
        return BH_OK;
    if (strerror_r(errno, why, sizeof why) != 0)
        (void)snprintf(why, sizeof why, "error %d", errno);
    (void)bh_fail(err, BH_EIO, "cannot be taken away: %s", why);
    return bh_fail_at(err, BH_EIO, (bh_mark){.file = rescue->path});
}

/* --- finding --- */

bool bh_rescue_there(const bh_rescue *rescue, int64_t *written)
{
    struct stat s;
    if (lstat(rescue->path, &s) != 0)
        return false;
    *written = (int64_t)s.st_mtim.tv_sec * 1000000000 + (int64_t)s.st_mtim.tv_nsec;
    return true;
}

/* Reads "WORDS NUMBER" at `*at` and moves behind it; false where something else stands there. */
static bool read_number(const char **at, const char *words, int base, uint64_t *number)
{
    char *end = NULL;
    const size_t length = strlen(words);
    if (strncmp(*at, words, length) != 0 || !isxdigit((unsigned char)(*at)[length]))
        return false;
    *number = strtoull(*at + length, &end, base);
    *at = end;
    return true;
}

/* Takes the last line off the content; false where it is not ours or does not fit. */
static bool take_last_line(bh_text *content, uint64_t *base)
{
    size_t at = content->length > 0 ? content->length - 1 : 0;
    uint64_t length = 0, hash = 0;
    while (at > 0 && content->bytes[at - 1] != '\n')
        at--;
    if (at == 0 || content->bytes[content->length - 1] != '\n')
        return false;
    const char *line = content->bytes + at - 1;
    if (!read_number(&line, LAST_LINE_BEGINS, 10, &length) ||
        !read_number(&line, " bytes, ", 16, &hash) ||
        !read_number(&line, ", begun from ", 16, base) || *line != '\n')
        return false;
    content->length = at - 1;
    content->bytes[at - 1] = '\0';
    return length == content->length && hash == bh_stamp_hash(content->bytes, content->length);
}

/* Do the last `tail` bytes begin a line? */
static bool begins_line(const bh_text *text, size_t tail)
{
    return tail == text->length || text->bytes[text->length - tail - 1] == '\n';
}

/* How many lines of `work` there are between the lines that both begin and end with. */
static int lines_apart(const bh_text *work, const bh_text *now)
{
    const size_t most = work->length < now->length ? work->length : now->length;
    size_t head = 0, tail = 0;
    while (head < most && work->bytes[head] == now->bytes[head])
        head++;
    if (head < work->length || head < now->length)
        while (head > 0 && work->bytes[head - 1] != '\n')
            head--;
    for (size_t i = 1;
         i <= most - head && work->bytes[work->length - i] == now->bytes[now->length - i]; i++)
        if (begins_line(work, i) && begins_line(now, i))
            tail = i;
    int n = 0;
    for (size_t i = head; i < work->length - tail; i++)
        n += work->bytes[i] == '\n' || i + 1 == work->length - tail;
    return n;
}

static bool equal(const bh_text *a, const bh_text *b)
{
    return a->length == b->length && (a->length == 0 || memcmp(a->bytes, b->bytes, a->length) == 0);
}

static void compare(bh_rescue_found *found, const bh_text *work, const bh_text *now, uint64_t base)
{
    found->length = work->length;
    found->lines = lines_apart(work, now);
    found->differs = !equal(work, now);
    found->same_base = found->whole && base == bh_stamp_hash(now->bytes, now->length);
    const double age = difftime(time(NULL), found->written);
    found->age = age > 0 ? age : 0;
}

bh_code bh_rescue_find(const bh_rescue *rescue, const bh_text *now, bh_text *into,
                       bh_rescue_found *found, bh_error *err)
{
    bh_text work = {0};
    struct stat s;
    uint64_t base = 0;
    *found = (bh_rescue_found){0};
    if (stat(rescue->path, &s) != 0 && errno == ENOENT)
        return BH_OK;
    bh_code code = bh_file_read(rescue->path, LIMIT, &work, err);
    if (code == BH_EABSENT)
        code = BH_EIO;
    if (code == BH_OK) {
        found->there = true;
        found->written = s.st_mtime;
        found->whole = take_last_line(&work, &base);
        compare(found, &work, now, base);
        if (into)
            bh_text_append_bytes(into, work.bytes, work.length);
    }
    bh_text_free(&work);
    if (into && into->failed)
        return bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return code;
}
