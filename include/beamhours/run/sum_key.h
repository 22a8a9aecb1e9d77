/* sum_key.h - what sums over channels are kept under. */
#ifndef BH_RUN_SUM_KEY_H
#define BH_RUN_SUM_KEY_H

#include <stddef.h>

#include "beamhours/run/channelsum.h"

/* Writes all that the sums for `request` depend on into `room`, which has room for size [bytes];
 * `leaver`: the detected particle on its way out, NULL where nothing is lost.  Returns how many
 * [bytes], or 0 where there is too little room. */
size_t bh_sum_key(const bh_channel_request *request, const bh_leaver *leaver, unsigned char *room,
                  size_t size);

#endif
