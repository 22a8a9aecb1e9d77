/* places.c - follows the XDG base directory specification where the user's own materials live. */
#include "beamhours/command/places.h"

#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/ioctl.h>
#include <sys/stat.h>
#include <unistd.h>

#include "beamhours/base/text.h"

enum { MOST = 64, DEEPEST = 6, PATH = 4096 };

static bool folder(const char *path)
{
    struct stat st;
    return stat(path, &st) == 0 && S_ISDIR(st.st_mode);
}

static char *joined(const char *a, const char *b)
{
    bh_text t = {0};
    bh_text_appendf(&t, "%s/%s", a, b);
    return bh_text_take(&t);
}

static bool holds(const char *path, const char *name)
{
    char *inside = joined(path, name);
    const bool yes = inside && folder(inside);
    free(inside);
    return yes;
}

/* Cuts the last name off; false when there is none. */
static bool upwards(char *path)
{
    char *slash = strrchr(path, '/');
    if (!slash)
        return false;
    *slash = '\0';
    return true;
}

/* Where this program is. */
static bool find_program(char path[PATH])
{
    const ssize_t n = readlink("/proc/self/exe", path, PATH - 1);
    path[n > 0 ? n : 0] = '\0';
    return n > 0;
}

char *bh_places_data(void)
{
    char path[PATH];
    if (!find_program(path))
        return NULL;
    for (int i = 0; i < DEEPEST && upwards(path) && path[0]; i++) {
        if (holds(path, "plans") && holds(path, "materials"))
            return joined(path, ".");
        if (holds(path, "share/beamhours/materials"))
            return joined(path, "share/beamhours");
    }
    return NULL;
}

/* `folder`/`name` where it can be read, else NULL. */
static char *readable(const char *folder, const char *name)
{
    char *path = joined(folder, name);
    if (path && access(path, R_OK) == 0)
        return path;
    free(path);
    return NULL;
}

#define DRAWING "beamhours-draw.so"

/* Where it was installed, one of the lines of share/beamhours/installed. */
static char *drawing_as_installed(void)
{
    char line[PATH];
    char *data = bh_places_data(), *list = data ? joined(data, "installed") : NULL, *found = NULL;
    FILE *f = list ? fopen(list, "r") : NULL;
    while (f && !found && fgets(line, sizeof line, f)) {
        line[strcspn(line, "\n")] = '\0';
        const char *name = strrchr(line, '/');
        if (name && strcmp(name + 1, DRAWING) == 0 && access(line, R_OK) == 0)
            found = strdup(line);
    }
    if (f)
        (void)fclose(f);
    free(list);
    free(data);
    return found;
}

char *bh_places_drawing(void)
{
    char path[PATH];
    if (!find_program(path) || !upwards(path))
        return NULL;
    char *found = readable(path, DRAWING);
    if (!found && upwards(path))
        found = readable(path, "lib/beamhours/" DRAWING);
    return found ? found : drawing_as_installed();
}

struct list {
    char **folders;
    int count;
    bool failed;
};

static void add(struct list *l, char *path)
{
    if (path && l->count < MOST)
        l->folders[l->count++] = path;
    else
        l->failed |= path == NULL;
}

static void add_each(struct list *l, const char *paths)
{
    while (paths && *paths) {
        const size_t n = strcspn(paths, ":");
        if (n)
            add(l, strndup(paths, n));
        paths += n + (paths[n] == ':');
    }
}

static void add_plan(struct list *l, const char *plan)
{
    const char *slash = plan ? strrchr(plan, '/') : NULL;
    if (!slash)
        add(l, strdup("."));
    else
        add(l, slash == plan ? strdup("/") : strndup(plan, (size_t)(slash - plan)));
}

static void add_own(struct list *l)
{
    const char *data = getenv("XDG_DATA_HOME"), *home = getenv("HOME");
    if (data && data[0] == '/')
        add(l, joined(data, "beamhours/materials"));
    else if (home && home[0])
        add(l, joined(home, ".local/share/beamhours/materials"));
}

char **bh_places_materials(const char *plan)
{
    struct list l = {calloc(MOST + 1, sizeof(char *)), 0, false};
    if (!l.folders)
        return NULL;
    add_plan(&l, plan);
    add_each(&l, getenv("BEAMHOURS_MATERIALS"));
    add_own(&l);
    char *data = bh_places_data();
    if (data)
        add(&l, joined(data, "materials"));
    free(data);
    if (!l.failed)
        return l.folders;
    bh_places_free(l.folders);
    return NULL;
}

void bh_places_free(char **folders)
{
    for (char **f = folders; f && *f; f++)
        free(*f);
    free(folders);
}

int bh_places_width(void)
{
    const char *columns = getenv("COLUMNS");
    const long said = columns ? strtol(columns, NULL, 10) : 0;
    if (said >= 20 && said <= 1000)
        return (int)said;
    struct winsize size;
    if (isatty(STDOUT_FILENO) && ioctl(STDOUT_FILENO, TIOCGWINSZ, &size) == 0 && size.ws_col >= 20)
        return size.ws_col;
    return 80;
}
