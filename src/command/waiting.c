/* waiting.c - a line on the terminal while a command works for long. */
#include "beamhours/command/waiting.h"

#include <time.h>
#include <unistd.h>

static const double patience = 0.5, apart = 0.1; /* s */

static double now(void)
{
    struct timespec t;
    (void)clock_gettime(CLOCK_MONOTONIC, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

static void told(void *asker, const char *what, size_t done, size_t count)
{
    bh_waiting *w = asker;
    const double at = w->shows ? now() : 0;
    if (!w->shows || at - w->begun < patience || at - w->last < apart)
        return;
    const int before = w->width;
    w->last = at;
    (void)fputc('\r', w->to);
    w->width = count ? fprintf(w->to, "working: %s, %zu of %zu", what, done, count)
                     : fprintf(w->to, "working: %s", what);
    if (w->width < before) /* the end of a longer line */
        (void)fprintf(w->to, "%*s", before - w->width, "");
    (void)fflush(w->to);
}

void bh_waiting_begin(bh_waiting *waiting, FILE *to)
{
    *waiting = (bh_waiting){.to = to, .shows = isatty(fileno(to)), .begun = now()};
    waiting->progress = (bh_progress){told, waiting};
}

void bh_waiting_end(bh_waiting *waiting)
{
    if (waiting->width <= 0)
        return;
    (void)fprintf(waiting->to, "\r%*s\r", waiting->width, "");
    (void)fflush(waiting->to);
    waiting->width = 0;
}
