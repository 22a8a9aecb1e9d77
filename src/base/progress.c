/* progress.c - how far long work has come. */
#include "beamhours/base/progress.h"

void bh_progress_tell(const bh_progress *progress, const char *what, size_t done, size_t count)
{
    if (progress && progress->told)
        progress->told(progress->asker, what, done, count);
}
