/* prepared.h - parts of acceptances made ready for sums, kept while they are asked for again. */
#ifndef BH_RATES_PREPARED_H
#define BH_RATES_PREPARED_H

#include "beamhours/rates/acceptance.h"
#include "beamhours/rates/quadrature.h"
#include "beamhours/rates/series.h"

/* What a part follows from. */
enum { BH_PREPARED_NUMBERS = 12 };

typedef struct {
    double key[BH_PREPARED_NUMBERS]; /* [1] */
    bool used;
    bh_acceptance_part part;
    bh_quadrature_rule rule;
    bh_moments moments; /* of the rule, for the series that was summed last */
} bh_prepared_part;

/* Never grows; begin with zeros.  One thread at a time. */
enum { BH_PREPARED_PARTS = 1024 };

typedef struct {
    bh_prepared_part parts[BH_PREPARED_PARTS];
} bh_prepared;

/* Returns bin `bin` (1 ..) of `acceptance`, or the whole for 0, with its rule; valid until the next
 * call.  The same numbers as made anew. */
bh_prepared_part *bh_prepared_part_of(bh_prepared *prepared, const bh_acceptance *acceptance,
                                      int bin);

#endif
