/* presence.c - who else has the same file open for change. */
#include "beamhours/base/presence.h"

#include <errno.h>
#include <fcntl.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>
#include <unistd.h>

#include "beamhours/base/beside.h"

enum { TRIES = 10, LINE = 160 };

struct bh_presence {
    char *path;
    int file;   /* -1: no mark */
    int number; /* of the session; 0: none is left */
};

enum held { HELD_BY_US, HELD_BY_OTHER, HELD_UNKNOWN };

/* --- the line in a mark --- */

static void this_host(char *out, size_t size)
{
    if (gethostname(out, size) != 0)
        (void)snprintf(out, size, "unknown");
    out[size - 1] = '\0';
}

static bool write_mark(int file)
{
    char host[64], line[LINE];
    this_host(host, sizeof host);
    (void)snprintf(line, sizeof line, "%ld %lld %s\n", (long)getpid(), (long long)time(NULL), host);
    return ftruncate(file, 0) == 0 && lseek(file, 0, SEEK_SET) == 0 &&
           bh_write_all(file, line, strlen(line));
}

static bh_other read_mark(int file)
{
    bh_other other = {0};
    char line[LINE], host[sizeof other.host];
    char *end = NULL;
    const ssize_t got = pread(file, line, sizeof line - 1, 0);
    line[got > 0 ? got : 0] = '\0';
    other.process = strtol(line, &end, 10);
    if (other.process <= 0 || *end != ' ')
        return (bh_other){0};
    other.since = (time_t)strtoll(end, &end, 10);
    if (*end != ' ')
        return (bh_other){0};
    end[1 + strcspn(end + 1, "\n")] = '\0';
    (void)snprintf(other.host, sizeof other.host, "%.*s", (int)sizeof other.host - 1, end + 1);
    this_host(host, sizeof host);
    other.here = strcmp(host, other.host) == 0;
    return other;
}

/* --- the lock on it --- */

static bool same_file(int file, const char *path)
{
    struct stat ours, there;
    return fstat(file, &ours) == 0 && lstat(path, &there) == 0 && ours.st_dev == there.st_dev &&
           ours.st_ino == there.st_ino;
}

/* Where locks cannot be had, the process of this host tells whether its mark is stale. */
static enum held held_without_lock(const bh_other *other)
{
    if (other->process <= 0)
        return HELD_UNKNOWN;
    const bool ended = other->here && kill((pid_t)other->process, 0) != 0 && errno == ESRCH;
    return ended ? HELD_BY_US : HELD_BY_OTHER;
}

/* Tries to lock the mark that is open as `file`. */
static enum held lock_mark(int file, bool made, bh_other *other)
{
    struct flock lock = {.l_type = F_WRLCK, .l_whence = SEEK_SET};
    const bh_other nobody = {0};
    *other = made ? nobody : read_mark(file);
    if (fcntl(file, F_SETLK, &lock) == 0) /* so nobody of this host has it */
        return other->process > 0 && !other->here ? HELD_BY_OTHER : HELD_BY_US;
    if (errno == EACCES || errno == EAGAIN)
        return HELD_BY_OTHER;
    return made ? HELD_BY_US : held_without_lock(other);
}

/* Opens the mark, made where there is none. */
static int open_mark(const char *path, bool *made)
{
    int file = open(path, O_RDWR | O_CREAT | O_EXCL | O_CLOEXEC, 0666);
    *made = file >= 0;
    if (file < 0 && errno == EEXIST)
        file = open(path, O_RDWR | O_NOFOLLOW | O_CLOEXEC);
    return file;
}

static bh_presence_state unknown(bh_error *err, const char *path, int number)
{
    char why[128];
    if (strerror_r(number, why, sizeof why) != 0)
        (void)snprintf(why, sizeof why, "error %d", number);
    (void)bh_fail(err, BH_EIO, "cannot be marked as open here: %s", why);
    (void)bh_fail_at(err, BH_EIO, (bh_mark){.file = path});
    return BH_PRESENCE_UNKNOWN;
}

/* One try; false where the mark changed under our hands. */
static bool try_mark(bh_presence *mark, bh_presence_state *state, bh_other *other, bh_error *err)
{
    bool made = false;
    const int file = open_mark(mark->path, &made);
    if (file < 0) {
        *state = unknown(err, mark->path, errno);
        return errno != ENOENT; /* ENOENT: just taken away, or no such folder */
    }
    const enum held held = lock_mark(file, made, other);
    const bool same = same_file(file, mark->path);
    const bool ours = same && held == HELD_BY_US && write_mark(file);
    const int why = errno;
    if (ours) {
        mark->file = file;
        *state = BH_PRESENCE_ALONE;
        return true;
    }
    (void)close(file);
    if (!same)
        return false;
    *state = held == HELD_BY_OTHER ? BH_PRESENCE_OTHER : unknown(err, mark->path, why);
    if (made)
        (void)unlink(mark->path);
    return true;
}

/* --- one of several sessions --- */

/* Whether another has this mark, by its lock or, where locks cannot be had, by what it says. */
static bool is_held(const char *path, bh_other *other)
{
    struct flock lock = {.l_type = F_RDLCK, .l_whence = SEEK_SET};
    const int file = open(path, O_RDONLY | O_NOFOLLOW | O_CLOEXEC);
    if (file < 0)
        return false;
    const bool known = fcntl(file, F_GETLK, &lock) == 0;
    *other = read_mark(file);
    (void)close(file);
    if (known && lock.l_type != F_UNLCK)
        return true;
    if (known)
        return other->process > 0 && !other->here;
    return held_without_lock(other) == HELD_BY_OTHER;
}

static bool is_held_number(const char *real, int number, bh_other *other)
{
    char *path = bh_beside_session(real, ".open", number, "");
    const bool held = !path || is_held(path, other); /* without memory nothing of it is touched */
    free(path);
    return held;
}

bool bh_presence_held(const char *path, int number)
{
    bh_other other;
    char *real = bh_real_path(path);
    const bool held = !real || is_held_number(real, number, &other);
    free(real);
    return held;
}

/* Unsaved work lies there that nobody looks after any more: its number stays free for it. */
static bool work_lies_there(const char *real, int number)
{
    struct stat s;
    char *path = bh_beside_session(real, ".unsaved", number, "");
    const bool there = path && lstat(path, &s) == 0;
    free(path);
    return there;
}

static bh_presence_state no_memory(bh_error *err)
{
    (void)bh_fail(err, BH_ENOMEM, "%s", bh_code_text(BH_ENOMEM));
    return BH_PRESENCE_UNKNOWN;
}

/* Marks with this number. */
static bh_presence_state mark_with(bh_presence *m, const char *real, int number, bh_other *other,
                                   bh_error *err)
{
    bh_presence_state state = BH_PRESENCE_UNKNOWN;
    free(m->path);
    m->path = bh_beside_session(real, ".open", number, "");
    m->number = number;
    if (!m->path)
        return no_memory(err);
    for (int i = 0; i < TRIES && !try_mark(m, &state, other, err); i++)
        ;
    return state;
}

/* The first number that is free. */
static bh_presence_state mark_any(bh_presence *m, const char *real, bool insist, bh_other *other,
                                  bh_error *err)
{
    bool held[BH_MOST_SESSIONS + 1] = {false};
    for (int n = 1; n <= BH_MOST_SESSIONS; n++) {
        bh_other who = {0};
        held[n] = is_held_number(real, n, &who);
        if (held[n] && !insist) {
            *other = who;
            return BH_PRESENCE_OTHER;
        }
    }
    for (int n = 1; n <= BH_MOST_SESSIONS; n++) {
        if (held[n] || work_lies_there(real, n))
            continue;
        const bh_presence_state state = mark_with(m, real, n, other, err);
        if (state != BH_PRESENCE_OTHER || !insist)
            return state;
    }
    m->number = 0;
    (void)bh_fail(err, BH_EIO, "cannot be marked as open here: too much unsaved work lies there");
    return BH_PRESENCE_UNKNOWN;
}

bh_presence_state bh_presence_open(const char *path, bool insist, bh_presence **mark,
                                   bh_other *other, bh_error *err)
{
    char *real = bh_real_path(path);
    bh_presence *m = calloc(1, sizeof *m);
    *mark = m;
    *other = (bh_other){0};
    if (m)
        *m = (bh_presence){.file = -1};
    const bh_presence_state state =
        m && real ? mark_any(m, real, insist, other, err) : no_memory(err);
    free(real);
    if (state == BH_PRESENCE_ALONE)
        *other = (bh_other){0};
    return state;
}

bh_presence_state bh_presence_take(const char *path, int number, bh_presence **mark, bh_error *err)
{
    bh_other other = {0};
    char *real = bh_real_path(path);
    bh_presence *m = calloc(1, sizeof *m);
    bh_presence_state state = BH_PRESENCE_OTHER;
    *mark = m;
    if (m)
        *m = (bh_presence){.file = -1, .number = number};
    if (!m || !real)
        state = no_memory(err);
    else if (!is_held_number(real, number, &other))
        state = mark_with(m, real, number, &other, err);
    free(real);
    return state;
}

bool bh_presence_ours(const bh_presence *mark)
{
    return mark->file >= 0 && same_file(mark->file, mark->path);
}

int bh_presence_number(const bh_presence *mark)
{
    return mark->number;
}

const char *bh_presence_path(const bh_presence *mark)
{
    return mark->path;
}

void bh_presence_close(bh_presence *mark)
{
    if (!mark)
        return;
    if (bh_presence_ours(mark))
        (void)unlink(mark->path);
    if (mark->file >= 0)
        (void)close(mark->file);
    free(mark->path);
    free(mark);
}
