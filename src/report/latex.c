/* latex.c - in commands that versions 2 and 3 of siunitx know: units that version 3 no longer has
 * are declared. */
#include "beamhours/report/latex.h"

#include <stdbool.h>
#include <string.h>

static const char *const needs[] = {"\\usepackage[utf8]{inputenc}",
                                    "\\usepackage[T1]{fontenc}",
                                    "\\usepackage{booktabs}",
                                    "\\usepackage{longtable}",
                                    "\\usepackage{siunitx}",
                                    "\\DeclareSIUnit\\bhbarn{b}",
                                    "\\DeclareSIUnit\\bhlight{\\ensuremath{c}}",
                                    "\\DeclareSIUnit\\bhhour{h}",
                                    "\\DeclareSIUnit\\bhday{d}",
                                    "\\DeclareSIUnit\\bhweek{weeks}",
                                    "\\DeclareSIUnit\\bhshift{shifts}"};

void bh_latex_packages(bh_text *out, const char *lead)
{
    for (size_t i = 0; i < sizeof needs / sizeof needs[0]; i++)
        bh_text_appendf(out, "%s%s\n", lead, needs[i]);
}

void bh_latex_needs(bh_text *out)
{
    bh_text_append(out, "% To be read with \\input; the preamble needs:\n");
    bh_latex_packages(out, "% ");
}

double bh_latex_wide(const bh_latex_size *size, size_t letters, size_t columns)
{
    return size->letter * (double)letters + size->gap * (double)columns;
}

const bh_latex_size *bh_latex_fit(size_t letters, size_t columns)
{
    static const bh_latex_size sizes[] = {
        {"\\footnotesize", 4.6, 6.0}, {"\\scriptsize", 4.1, 6.0}, {"\\tiny", 3.6, 5.0}};
    size_t i = 0;
    while (i + 1 < sizeof sizes / sizeof sizes[0] &&
           bh_latex_wide(&sizes[i], letters, columns) > BH_LATEX_PAGE)
        i++;
    return &sizes[i];
}

/* --- words --- */

static const struct {
    const char *read, *written;
} signs[] = {{"\\", "\\textbackslash{}"},
             {"{", "\\{"},
             {"}", "\\}"},
             {"$", "\\$"},
             {"&", "\\&"},
             {"#", "\\#"},
             {"%", "\\%"},
             {"_", "\\_"},
             {"^", "\\textasciicircum{}"},
             {"~", "\\textasciitilde{}"},
             {"<", "\\textless{}"},
             {">", "\\textgreater{}"},
             {"|", "\\textbar{}"},
             {"\"", "\\textquotedbl{}"},
             {"`", "\\textasciigrave{}"},
             {"''", "'{}'{}"},
             {"--", "-{}-{}"},
             {"[", "{[}"}, /* behind a line's end it would be a length */
             {"]", "{]}"},
             {"*", "{*}"},
             {"\n", " "},
             {"\r", " "},
             {"±", "\\ensuremath{\\pm}"},
             {"×", "\\ensuremath{\\times}"},
             {"²", "\\ensuremath{^2}"},
             {"µ", "\\ensuremath{\\mu}"},
             {"θ", "\\ensuremath{\\theta}"},
             {"σ", "\\ensuremath{\\sigma}"}};

void bh_latex_words(bh_text *out, const char *words)
{
    const size_t count = sizeof signs / sizeof signs[0];
    while (*words) {
        size_t i = 0;
        while (i < count && strncmp(words, signs[i].read, strlen(signs[i].read)) != 0)
            i++;
        if (i < count)
            bh_text_append(out, signs[i].written);
        else
            bh_text_append_bytes(out, words, 1);
        words += i < count ? strlen(signs[i].read) : 1;
    }
}

/* --- units --- */

static const struct {
    const char *word, *macro;
} units[] = {
    {"MeV", "\\mega\\electronvolt"},
    {"GeV", "\\giga\\electronvolt"},
    {"keV", "\\kilo\\electronvolt"},
    {"c", "\\bhlight"},
    {"b", "\\bhbarn"},
    {"mb", "\\milli\\bhbarn"},
    {"ub", "\\micro\\bhbarn"},
    {"nb", "\\nano\\bhbarn"},
    {"pb", "\\pico\\bhbarn"},
    {"fb", "\\femto\\bhbarn"},
    {"sr", "\\steradian"},
    {"msr", "\\milli\\steradian"},
    {"deg", "\\degree"},
    {"fm", "\\femto\\metre"},
    {"cm", "\\centi\\metre"},
    {"s", "\\second"},
    {"h", "\\bhhour"},
    {"d", "\\bhday"},
    {"weeks", "\\bhweek"},
    {"shifts", "\\bhshift"},
    {"Hz", "\\hertz"},
    {"mC", "\\milli\\coulomb"},
    {"uA", "\\micro\\ampere"},
    {"W", "\\watt"},
    {"mg", "\\milli\\gram"},
    {"g", "\\gram"},
    {"%", "\\percent"},
    {"mm", "\\milli\\metre"},
};

/* The macro of a word of `length` bytes, or NULL. */
static const char *macro_of(const char *word, size_t length)
{
    for (size_t i = 0; i < sizeof units / sizeof units[0]; i++)
        if (strlen(units[i].word) == length && strncmp(units[i].word, word, length) == 0)
            return units[i].macro;
    return NULL;
}

/* "cm2" or "cm": the macro of the word and its power; false for a word that is none. */
static bool append_unit(const char *word, size_t length, bool per, bh_text *out)
{
    const char *last = length > 1 ? &word[length - 1] : "";
    const char *power = *last == '2' ? "\\squared" : *last == '3' ? "\\cubed" : "";
    const char *macro = macro_of(word, length - (power[0] != '\0'));
    if (!macro)
        return false;
    bh_text_appendf(out, "%s%s%s", per ? "\\per" : "", macro, power);
    return true;
}

void bh_latex_unit(bh_text *out, const char *unit)
{
    bh_text macros = {0};
    bool known = true, per = false;
    const char *at = unit;
    while (known && *at) {
        const size_t n = strcspn(at, "/");
        if (per || n != 1 || at[0] != '1')
            known = append_unit(at, n, per, &macros);
        per = true;
        at += n + (at[n] == '/');
    }
    if (known && macros.bytes)
        bh_text_appendf(out, "\\si{%s}", macros.bytes);
    else
        bh_latex_words(out, unit);
    out->failed |= macros.failed;
    bh_text_free(&macros);
}
