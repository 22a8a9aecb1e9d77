/* explain_text.h - an explanation of one row as text. */
#ifndef BH_REPORT_EXPLAIN_TEXT_H
#define BH_REPORT_EXPLAIN_TEXT_H

#include "beamhours/base/text.h"
#include "beamhours/run/explain.h"

/* Appends it line by line, wrapped to `width` terminal columns (at least 80 are used). */
void bh_report_explanation(const bh_explanation *explanation, int width, bh_text *out);

#endif
