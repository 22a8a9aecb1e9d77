/* nuclide.c - looks up nuclides and elements, and reads and writes their names. */
#include "beamhours/units/nuclide.h"

#include <stdio.h>
#include <string.h>

enum { LAST_ELEMENT = 118, LARGEST_A = 299 };

static const char symbols[LAST_ELEMENT + 1][3] = {
    "",   "H",  "He", "Li", "Be", "B",  "C",  "N",  "O",  "F",  "Ne", "Na", "Mg", "Al", "Si",
    "P",  "S",  "Cl", "Ar", "K",  "Ca", "Sc", "Ti", "V",  "Cr", "Mn", "Fe", "Co", "Ni", "Cu",
    "Zn", "Ga", "Ge", "As", "Se", "Br", "Kr", "Rb", "Sr", "Y",  "Zr", "Nb", "Mo", "Tc", "Ru",
    "Rh", "Pd", "Ag", "Cd", "In", "Sn", "Sb", "Te", "I",  "Xe", "Cs", "Ba", "La", "Ce", "Pr",
    "Nd", "Pm", "Sm", "Eu", "Gd", "Tb", "Dy", "Ho", "Er", "Tm", "Yb", "Lu", "Hf", "Ta", "W",
    "Re", "Os", "Ir", "Pt", "Au", "Hg", "Tl", "Pb", "Bi", "Po", "At", "Rn", "Fr", "Ra", "Ac",
    "Th", "Pa", "U",  "Np", "Pu", "Am", "Cm", "Bk", "Cf", "Es", "Fm", "Md", "No", "Lr", "Rf",
    "Db", "Sg", "Bh", "Hs", "Mt", "Ds", "Rg", "Cn", "Nh", "Fl", "Mc", "Lv", "Ts", "Og",
};

const char *bh_element_symbol(int z)
{
    return z >= 1 && z <= LAST_ELEMENT ? symbols[z] : NULL;
}

int bh_element_z(const char *symbol)
{
    for (int z = 1; z <= LAST_ELEMENT; z++)
        if (strcmp(symbol, symbols[z]) == 0)
            return z;
    return 0;
}

const bh_nuclide *bh_nuclide_find(int z, int a)
{
    size_t low = 0, high = bh_nuclide_table_size;
    while (low < high) {
        const size_t middle = low + (high - low) / 2;
        const bh_nuclide *n = &bh_nuclide_table[middle];
        if (n->z == z && n->a == a)
            return n;
        if (n->z < z || (n->z == z && n->a < a))
            low = middle + 1;
        else
            high = middle;
    }
    return NULL;
}

const bh_nuclide *bh_element_isotopes(int z, size_t *count)
{
    const bh_nuclide *first = NULL;
    size_t n = 0;
    for (size_t i = 0; z >= 1 && i < bh_nuclide_table_size; i++) {
        if (bh_nuclide_table[i].z != z)
            continue;
        if (!first)
            first = &bh_nuclide_table[i];
        n++;
    }
    if (count)
        *count = n;
    return first;
}

double bh_element_mass(int z)
{
    size_t count = 0;
    const bh_nuclide *isotope = bh_element_isotopes(z, &count);
    double mass = 0.0;
    for (size_t i = 0; i < count; i++)
        mass += isotope[i].abundance * isotope[i].atomic_mass;
    return mass;
}

static bool is_digit(char c)
{
    return c >= '0' && c <= '9';
}

/* Digits at the start of `text` as a mass number, 0 when there are none or too many. */
static int mass_number(const char *text, size_t *length)
{
    int a = 0;
    *length = 0;
    while (is_digit(text[*length]) && *length < 4)
        a = 10 * a + (text[(*length)++] - '0');
    return a <= LARGEST_A ? a : 0;
}

bool bh_nuclide_parse(const char *name, int *z, int *a)
{
    size_t digits;
    const int mass = mass_number(name, &digits);
    const char *symbol = name + digits;
    const int charge = bh_element_z(symbol);
    const bool neutron = mass == 1 && strcmp(symbol, "n") == 0;
    if (name[0] == '0' || (digits && !neutron && (charge == 0 || mass < charge)))
        return false;
    if (!neutron && charge == 0)
        return false;
    *z = charge;
    *a = mass;
    return true;
}

char *bh_nuclide_name(int z, int a, char out[8])
{
    const char *symbol = z == 0 && a == 1 ? "n" : bh_element_symbol(z);
    if (!symbol)
        (void)snprintf(out, 8, "?");
    else if (a >= 1 && a <= LARGEST_A)
        (void)snprintf(out, 8, "%d%s", a, symbol);
    else
        (void)snprintf(out, 8, "%s", symbol);
    return out;
}

static const bh_nuclide *most_abundant(int z)
{
    size_t count = 0;
    const bh_nuclide *best = bh_element_isotopes(z, &count);
    for (const bh_nuclide *n = best; count > 0; n++, count--)
        if (n->abundance > best->abundance)
            best = n;
    return best;
}

/* One to three letters in any case as an element: "pb", "PB" -> 82; 0 for none. */
static int element_any_case(const char *letters, size_t length)
{
    char symbol[3] = "";
    if (length < 1 || length > 2)
        return 0;
    for (size_t i = 0; i < length; i++) {
        const int upper = letters[i] & ~0x20;
        symbol[i] = (char)(i == 0 ? upper : upper | 0x20);
    }
    return bh_element_z(symbol);
}

static bool is_letter(char c)
{
    return (c | 0x20) >= 'a' && (c | 0x20) <= 'z';
}

static const char *skip_joint(const char *text)
{
    while (*text == ' ' || *text == '-' || *text == '_' || *text == '^')
        text++;
    return text;
}

const bh_nuclide *bh_nuclide_suggest(const char *name)
{
    size_t before, after = 0, letters = 0;
    int a = mass_number(skip_joint(name), &before);
    const char *symbol = skip_joint(skip_joint(name) + before);
    while (is_letter(symbol[letters]))
        letters++;
    const char *rest = skip_joint(symbol + letters);
    if (!before)
        a = mass_number(rest, &after);
    if (strcmp(name, "D") == 0 || strcmp(name, "T") == 0)
        return bh_nuclide_find(1, name[0] == 'D' ? 2 : 3);
    const int z = element_any_case(symbol, letters);
    if (z == 0 || rest[after] != '\0')
        return NULL;
    if (before || after)
        return bh_nuclide_find(z, a);
    return letters == 2 || bh_element_z(symbol) ? most_abundant(z) : NULL; /* "n" is not N */
}
