/* inquiry.h - what the screen asks its worker beside the table: explanations, curves, what it would
 * take. */
#ifndef BH_SCREEN_INQUIRY_H
#define BH_SCREEN_INQUIRY_H

#include "beamhours/screen/model.h"

/* Asks what is due and withdraws what is of no use any more, `idle` [s] after the last key.
 * Returns [s] after how long it has to be called again though nothing happens; below 0: never. */
double bh_inquire(bh_model *model, bh_worker *worker, double idle);

/* Before another text is evaluated: the curve of the one before is not to hold it up. */
void bh_inquire_put_off(bh_model *model, bh_worker *worker);

#endif
