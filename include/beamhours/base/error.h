/* error.h - what went wrong, and where in which file it went wrong. */
#ifndef BH_BASE_ERROR_H
#define BH_BASE_ERROR_H

/* Every outcome the engine can report: X(code, sentence used when nothing better is known). */
#define BH_CODES(X)                                         \
    X(BH_OK, "no error")                                    \
    X(BH_EDOMAIN, "a value is outside the formula's range") \
    X(BH_ENOCONV, "a numerical method did not converge")    \
    X(BH_EPLAN, "the plan document is not valid")           \
    X(BH_ENOMEM, "out of memory")                           \
    X(BH_EIO, "a file could not be read or written")        \
    X(BH_EABSENT, "no such file, or it may not be read")    \
    X(BH_ECREATE, "the output file cannot be created")

typedef enum {
#define BH_CODE_NAME(code, sentence) code,
    BH_CODES(BH_CODE_NAME)
#undef BH_CODE_NAME
} bh_code;

/* A place in a document.  The name belongs to the document. */
typedef struct {
    const char *file; /* as the user gave it; NULL when there is no file */
    int line;         /* counted from 1; 0 when the whole file is meant */
    int column;       /* counted from 1; 0 when the whole line is meant */
} bh_mark;

/* Holds copies only, so it outlives the document it speaks of. */
typedef struct {
    bh_code code;
    char file[256]; /* empty when there is none; a longer name keeps its end */
    int line;       /* as in bh_mark */
    int column;     /* as in bh_mark */
    char text[512]; /* one sentence, no newline, always terminated */
} bh_error;

#if defined(__GNUC__)
#define BH_CHECKED           __attribute__((warn_unused_result))
#define BH_PRINTF(fmt, args) __attribute__((format(printf, fmt, args)))
#else
#define BH_CHECKED
#define BH_PRINTF(fmt, args)
#endif

/* The sentence for `code`, even for a number that is no code.  Never NULL. */
const char *bh_code_text(bh_code code);

/* Fills `err` (may be NULL) and returns `code`, so that a function can `return bh_fail(...)`. */
bh_code bh_fail(bh_error *err, bh_code code, const char *fmt, ...) BH_PRINTF(3, 4);

/* Adds the place on the way up; the innermost place wins.  Returns `code`; `err` may be NULL. */
bh_code bh_fail_at(bh_error *err, bh_code code, bh_mark at);

#endif
