/* syntax.h - what the YAML parser complains of, in words that help whoever wrote the file. */
#ifndef BH_DOCUMENT_SYNTAX_H
#define BH_DOCUMENT_SYNTAX_H

#include <yaml.h>

#include "beamhours/base/diag.h"
#include "beamhours/document/source.h"

/*
 * Adds the fault that `parser` stopped at to `diags`, for the mapping `key`.  `cursor` is any place
 * in the text that was parsed, which ends with NUL; `open` is where the innermost list or mapping
 * begins that was open, its line 0 when there was none.  That the parser had no memory left is told
 * to `diags` too.
 */
void bh_syntax_say(const yaml_parser_t *parser, bh_cursor cursor, bh_mark open, const char *key,
                   bh_diags *diags);

#endif
