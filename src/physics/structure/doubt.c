/* doubt.c - how far descriptions of nuclei may be trusted: what they were measured with, and which
 * of them may doubt another. */
#include <math.h>
#include <string.h>

#include "beamhours/physics/form_factor.h"

enum { LIGHT = 4, ANY = 1000 }; /* nucleons */

static const struct {
    const char *model; /* NULL: any */
    int z, from, to;   /* protons, 0: any; nucleons */
    bh_structure_data data;
} table[] = {
    {"prad-2019",
     1,
     1,
     1,
     {0.005, "Xiong et al., Nature 575 (2019) 147: points of 0.2 to 0.6 % (from memory)"}},
    {NULL,
     1,
     1,
     1,
     {0.01, "absolute cross sections of Walker et al., Phys. Rev. D 49 (1994) 5671, and Andivahis "
            "et al., "
            "Phys. Rev. D 50 (1994) 5491, 1.8 to 1.9 %; of several together 1 % (from memory)"}},
    {NULL,
     1,
     2,
     2,
     {0.03, "A(Q2): Simon et al., Nucl. Phys. A 364 (1981) 285, 1 to 2 %; Platchkov et al., Nucl. "
            "Phys. A "
            "510 (1990) 740, 2 to 4 %; above 0.7 GeV2 6 % (from memory)"}},
    {NULL,
     0,
     3,
     3,
     {0.03,
      "Amroun et al., Nucl. Phys. A 579 (1994) 596: normalisations of 2 to 3 % (from memory)"}},
    {NULL, 2, 4, 4, {0.02, "McCarthy, Sick & Whitney, Phys. Rev. C 15 (1977) 1396 (from memory)"}},
    {NULL,
     6,
     12,
     12,
     {0.01, "Cardman et al., Phys. Lett. B 91 (1980) 203; Reuter et al., Phys. Rev. C 26 (1982) "
            "806 (from "
            "memory)"}},
    {NULL,
     0,
     LIGHT + 1,
     ANY,
     {0.02, "de Vries et al., At. Data Nucl. Data Tables 36 (1987) 495: measured beside 1H or 12C, "
            "1 to 3 "
            "% (from memory)"}},
};

bh_structure_data bh_structure_measured(const bh_structure *structure)
{
    const char *model = structure->row->name;
    const int z = structure->z, a = structure->a;
    for (size_t i = 0; i < sizeof table / sizeof table[0]; i++)
        if ((!table[i].model || strcmp(table[i].model, model) == 0) &&
            (table[i].z == 0 || table[i].z == z) && a >= table[i].from && a <= table[i].to)
            return table[i].data;
    return (bh_structure_data){0, ""};
}

double bh_structure_data_uncertainty(const bh_structure *structure, double q2)
{
    const double known = bh_structure_measured(structure).uncertainty;
    double ge2, gm2, charge2, ignored;
    const double none = 0;
    bh_structure_eval(structure, 1, &q2, &ge2, &gm2);
    bh_structure_eval(structure, 1, &none, &charge2, &ignored);
    return charge2 > 0 ? known * fmin(1, fabs(1 - ge2 / charge2)) : known;
}

bool bh_structure_compares(const bh_structure_model *model, int set, int z, int a)
{
    const int sets = bh_structure_sets(model, z, a);
    if (set < 1 || set > sets || strcmp(model->source, "definition") == 0)
        return false;
    const bool radius = strcmp(model->name, "uniform") == 0 || strcmp(model->name, "helm") == 0 ||
                        (strcmp(model->name, "fermi-2p") == 0 && set == sets);
    return !radius || a > LIGHT;
}
