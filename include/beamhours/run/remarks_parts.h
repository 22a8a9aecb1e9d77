/* remarks_parts.h - what remarks are kept as; for the files that keep them and put them in words.
 */
#ifndef BH_RUN_REMARKS_PARTS_H
#define BH_RUN_REMARKS_PARTS_H

#include <stdbool.h>

#include "beamhours/run/remarks.h"

enum { BH_REMARK_TEXT = 240, BH_REMARK_LONG = 480 };

/* Texts of a remark, own copies: each setting of a long plan has some, so they are no longer than
 * they have to be. */
enum {
    BH_KEPT_KEY,
    BH_KEPT_WHO,
    BH_KEPT_WHAT,
    BH_KEPT_SETTING,
    BH_KEPT_LAST,
    BH_KEPT_PLAIN,
    BH_KEPT_TEXTS
}; /* BH_KEPT_PLAIN: the key as it was noted */

typedef struct {
    bh_remark remark; /* its texts are not read */
    char *text[BH_KEPT_TEXTS];
    size_t size[BH_KEPT_TEXTS]; /* [bytes] of room */
    int settings;
    bool moved;
} bh_kept_remark;

struct bh_remarks {
    size_t count, room;
    bh_kept_remark *list;
    bool failed;
};

#endif
