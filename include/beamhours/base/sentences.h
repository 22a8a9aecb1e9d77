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
#define BH_SAY_UNKNOWN_KEY     "no such key in %s; did you mean %s?"
#define BH_SAY_UNKNOWN_KEY_OF  "no such key in %s; the keys there are %s"
#define BH_SAY_MISSING_KEY     "missing in %s; add for example %s: %s"
#define BH_SAY_MISSING_GROUP   "%s has none of %s; give one of them"
#define BH_SAY_TWO_OF_GROUP    "%s and %s exclude each other; keep one of them"
#define BH_SAY_NEED_VALUE      "%s where one value is needed; write for example %s"
#define BH_SAY_NEED_LIST       "%s where a list is needed; write for example %s"
#define BH_SAY_NEED_KEYS       "%s where keys with values are needed; write for example %s"
#define BH_SAY_NOTHING_WRITTEN "nothing is written here; write for example %s"
#define BH_SAY_UNKNOWN_WORD    "%s is not known here; did you mean %s?"
#define BH_SAY_UNKNOWN_WORD_OF "%s is not known here; one of %s would do"
#define BH_SAY_TOO_SMALL       "%s is too small; %s or more would do"
#define BH_SAY_NOT_ABOVE       "%s is too small; more than %s would do"
#define BH_SAY_TOO_LARGE       "%s is too large; %s or less would do"
#define BH_SAY_NO_COUNT        "%s is not a whole number; write digits alone, such as %s"
#define BH_SAY_NO_NUMBER       "%s is not a number; write one without unit, such as %s"
#define BH_SAY_NO_NAME         "%s cannot be a name; letters, digits, _ - and + would do"
#define BH_SAY_NAME_TWICE      "%s is also the name in line %d; change one of the two"
#define BH_SAY_BARE_EXTENT \
    "%s leaves open whether half or full is meant; write ±%s or {from: -%s, to: %s}"
#define BH_SAY_NEED_RANGE   "%s where two limits are needed; write for example %s"
#define BH_SAY_EXTENT_ORDER "from %s to %s does not rise; let from be less than to"
#define BH_SAY_EMPTY_LIST   "an empty list; write at least one entry, such as %s"
#define BH_SAY_SWEEP_STEP   "steps of %s from %s meet %s and %s but not %s; change to or step"
#define BH_SAY_SWEEP_WAY    "a step of %s does not lead from %s to %s; change its sign or size"
#define BH_SAY_SWEEP_UNITS \
    "%s and %s do not mix in one sweep; write both for the whole ion or both per mass number"
#define BH_SAY_SWEEP_LONG "more than %d values; make the sweep shorter"

/* physics: structure */
#define BH_SAY_STRUCTURE_UNKNOWN "%s is no structure model; did you mean %s?"
#define BH_SAY_STRUCTURE_NUCLEUS "%s does not describe %s; one of %s does"
#define BH_SAY_STRUCTURE_SET     "there is no %s: the sets of %s for %s end at %d"

/* matter: materials */

/* plan: sense */

/* run: evaluation */

#endif
