/* sentences.h - every sentence an error or a warning of a plan or a material may use, in one list.
 */
#ifndef BH_BASE_SENTENCES_H
#define BH_BASE_SENTENCES_H

/* Printf formats, passed as they stand to bh_diags_add so that the compiler checks the arguments.
 * Errors are named BH_SAY_..., warnings BH_WARN_...; each says what was read and what would do.
 * A test reads this file and demands that the bad plans provoke every BH_SAY_ sentence. */

/* document: YAML */

/* units: quantities */

/* schema: keys and values */

/* matter: materials */

/* plan: sense */

/* run: evaluation */

#endif
