/* row.c - the cells of one row of the run table. */
#include "beamhours/run/row.h"

#include <math.h>

static const char *const sentences[BH_WHY_COUNT] = {
#define SENTENCE(id, sentence) [id] = (sentence),
    BH_REASONS(SENTENCE)
#undef SENTENCE
};

const char *bh_why_text(bh_why why)
{
    return sentences[why];
}

void bh_row_put(bh_row *row, bh_column_id column, double value, bh_why why)
{
    row->number[column] = isfinite(value) ? value : (double)NAN;
    row->why[column] = isfinite(value) ? BH_WHY_NOTHING : (unsigned char)why;
}
