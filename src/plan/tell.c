/* tell.c - complaints about sense, each made once. */
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

#include "beamhours/base/nearest.h"
#include "beamhours/base/number.h"
#include "beamhours/base/sentences.h"
#include "beamhours/plan/making.h"
#include "beamhours/schema/reading.h"
#include "beamhours/units/constants.h"
#include "beamhours/units/nuclide.h"

void bh_tell(const bh_making *making, bh_mark at, const bh_section *section, const char *key,
             const char *fmt, ...)
{
    char text[600];
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(text, sizeof text, fmt, args);
    va_end(args);
    if (!bh_diags_told(making->reading.diags, at, text))
        bh_say(&making->reading, at, section, key, "%s", text);
}

/* "A, B or C"; cut where there are many. */
static const char *all_of(const bh_unfound *unfound, char *out, size_t size)
{
    const char *some[9] = {NULL};
    size_t n = 0;
    for (size_t i = 0; i < unfound->count && n < 8; i++) {
        size_t k = 0;
        while (k < n && unfound->names[i] && strcmp(some[k], unfound->names[i]) != 0)
            k++;
        if (k == n && unfound->names[i])
            some[n++] = unfound->names[i];
    }
    return bh_words_text(some, out, size);
}

void bh_tell_no_target(const bh_making *making, const bh_unfound *unfound)
{
    const bh_word *word = unfound->word;
    const char *near = bh_nearest(word->text, unfound->names, unfound->count);
    if (near) {
        bh_tell(making, word->at, unfound->section, unfound->key, BH_SAY_NO_TARGET, word->text,
                near);
        return;
    }
    char all[300];
    bh_tell(making, word->at, unfound->section, unfound->key, BH_SAY_NO_TARGET_OF, word->text,
            all_of(unfound, all, sizeof all));
}

void bh_tell_no_arm(const bh_making *making, const bh_unfound *unfound)
{
    const bh_word *word = unfound->word;
    const char *near = bh_nearest(word->text, unfound->names, unfound->count);
    if (near) {
        bh_tell(making, word->at, unfound->section, unfound->key, BH_SAY_NO_ARM, word->text, near);
        return;
    }
    char all[300];
    bh_tell(making, word->at, unfound->section, unfound->key, BH_SAY_NO_ARM_OF, word->text,
            all_of(unfound, all, sizeof all));
}

const char *bh_angle_text(double angle, char out[BH_QUANTITY_SIZE])
{
    char number[BH_NUMBER_SIZE];
    double rounded = angle / BH_DEGREE;
    (void)bh_number_digits(rounded, 7, number, sizeof number);
    if (bh_number_parse(number, NULL, &rounded) == BH_OK)
        (void)bh_number_print(rounded, number, sizeof number); /* without closing zeros */
    (void)snprintf(out, BH_QUANTITY_SIZE, "%s deg", number);
    return out;
}

void bh_tell_no_nuclide(const bh_making *making, const bh_word *word, const bh_section *section,
                        const char *key, int z)
{
    const bh_nuclide *near = bh_nuclide_suggest(word->text);
    const char *symbol = bh_element_symbol(z);
    char name[8];
    const bool isotope = strpbrk(word->text, "0123456789") != NULL;
    if (near && symbol && near->z == z && !isotope)
        bh_tell(making, word->at, section, key, BH_SAY_NUCLIDE_NEAR, word->text, symbol);
    else if (near)
        bh_tell(making, word->at, section, key, BH_SAY_NUCLIDE_NEAR, word->text,
                bh_nuclide_name(near->z, near->a, name));
    else
        bh_tell(making, word->at, section, key, BH_SAY_NO_NUCLIDE, word->text,
                symbol ? symbol : "12C");
}
