/* beamhours.h - libbeamhours: load a plan, change a value, evaluate it, read the run table by
 * column. */
#ifndef BEAMHOURS_H
#define BEAMHOURS_H

#include <stddef.h>

#ifdef __cplusplus
extern "C" {
#endif

#if defined(__GNUC__)
#define BH_API __attribute__((visibility("default")))
#else
#define BH_API
#endif

#define BH_VERSION "0.1.0" /* the one place it is written; the build reads it here */

/* The edition that is running, which may be newer than the BH_VERSION compiled in.  Never NULL. */
BH_API const char *bh_version(void);

/*
 * A plan, with the changes made to it, and the run table that follows.  Nothing here is global: use
 * one session in one thread at a time, as many sessions in as many threads as you like.
 * The library calls GSL; GSL's aborting error handler is switched off when a session is opened
 * (that switch belongs to the whole process).
 */
typedef struct bh_session bh_session;

typedef enum {
    BH_DONE = 0,
    BH_BAD_PLAN, /* the plan, or a change, has errors: bh_session_message lists them */
    BH_NO_FILE,  /* the plan file cannot be read */
    BH_NO_MEMORY,
    BH_BAD_CALL /* no plan loaded yet, or NULL where something is needed */
} bh_result;

/*
 * A new session that looks for materials in `folders` (NULL-terminated, in order), or NULL when
 * there is no memory.  The installed library of materials is `pkg-config --variable=materials
 * beamhours`.
 */
BH_API bh_session *bh_session_new(const char *const *folders);
BH_API void bh_session_free(bh_session *session);

/* Loads the plan in file `path`; or in the `length` bytes of `text`, called `name` in messages.
 * Forgets the changes made before.  After a failure the session has no plan. */
BH_API bh_result bh_session_load(bh_session *session, const char *path);
BH_API bh_result bh_session_load_text(bh_session *session, const char *text, size_t length,
                                      const char *name);

/* Changes one value: bh_session_change(s, "beam.current", "40 uA").  `path` is dotted, list items
 * by name or by number from 1; `value` is one YAML scalar or flow node.  The change stays until the
 * next load; the same path again replaces it.  After BH_BAD_PLAN the plan is as before. */
BH_API bh_result bh_session_change(bh_session *session, const char *path, const char *value);

/* Evaluates the plan as it now stands. */
BH_API bh_result bh_session_evaluate(bh_session *session);

/* Rows of the last evaluation: one for each arm of each setting; 0 before an evaluation. */
BH_API size_t bh_session_rows(const bh_session *session);

/* Returns [1] the number in `row` (from 0) under `column`, in the unit that the column's key names
 * ("signal_rate_Hz"); NAN where it is empty, no number, or there is no such cell. */
BH_API double bh_session_number(const bh_session *session, size_t row, const char *column);

/* The text in `row` under `column` ("setting"); NULL where it is empty or no text. */
BH_API const char *bh_session_text(const bh_session *session, size_t row, const char *column);

/* Why a cell is empty; NULL where it is not. */
BH_API const char *bh_session_reason(const bh_session *session, size_t row, const char *column);

/* The i-th column's key (from 0) and what it means; NULL past the end. */
BH_API const char *bh_column_key(size_t i);
BH_API const char *bh_column_meaning(size_t i);

/* Errors, warnings and cautions of the last call that can have some, one a line, each
 * "FILE:LINE:COLUMN: [warning: |caution: ]KEY: text"; their number, and the i-th. */
BH_API size_t bh_session_messages(const bh_session *session);
BH_API const char *bh_session_message(const bh_session *session, size_t i);

#ifdef __cplusplus
}
#endif

#endif
