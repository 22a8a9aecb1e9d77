/* form.h - a text written as YAML: plain, in quotes, or under | and >. */
#ifndef BH_DOCUMENT_FORM_H
#define BH_DOCUMENT_FORM_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/base/text.h"
#include "beamhours/document/node.h"
#include "beamhours/document/pieces.h"

typedef enum {
    BH_FORM_AS_IT_IS, /* the text is YAML already */
    BH_FORM_PLAIN,
    BH_FORM_SINGLE,
    BH_FORM_DOUBLE
} bh_form;

/* Could the text be written so, within brackets (`flow`) or not?  May say no where it could. */
bool bh_form_fits(bh_form form, const char *text, bool flow);

/* The plainest form that fits. */
bh_form bh_form_choose(const char *text, bool flow);

/* Appends the text in a form that fits. */
void bh_form_append(bh_form form, const char *text, bh_text *into);

/* A text under | or > as it is to be. */
typedef struct {
    size_t from, to; /* [bytes] to be replaced */
    bh_text written; /* what is to stand there */
    bh_text value;   /* what will be read from it */
} bh_block;

/* Writes `text` (lines ended by LF) in place of `node`, a | or > text of `whole`, under the same
 * heading and with the same indentation, into `block`, whose texts the caller frees.  `all`: every
 * line of it; else only the paragraphs that change, where that is possible.
 * False where the heading cannot hold the text, or it is not possible. */
bool bh_form_block(bh_bytes whole, const bh_node *node, const char *text, bool all,
                   bh_block *block);

#endif
