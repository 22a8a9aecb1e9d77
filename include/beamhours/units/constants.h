/* constants.h - every physical constant the engine uses, all from one edition. */
#ifndef BH_UNITS_CONSTANTS_H
#define BH_UNITS_CONSTANTS_H

/* The comment behind a constant has this shape, checked by `make docs-lint`:
 *     [unit] +- uncertainty, or exact; source */
#define BH_PI     3.14159265358979323846 /* [1] exact to double precision; definition */
#define BH_DEGREE (BH_PI / 180.0)        /* [rad] exact to double precision; definition */

#define BH_ALPHA (1.0 / 137.035999177) /* [1] +- 1.1e-12; CODATA 2022 */
#define BH_HBARC 197.3269804593        /* [MeV fm] exact; SI 2019 definition of h, c and e */
#define BH_HBARC2_UB \
    389379372.172 /* [MeV^2 ub] exact to 12 digits; BH_HBARC squared, 1 fm^2 = 1e4 ub */
#define BH_ELEMENTARY  1.602176634e-19  /* [C] exact; SI 2019 */
#define BH_AVOGADRO    6.02214076e23    /* [1/mol] exact; SI 2019 */
#define BH_BOLTZMANN_R 8.31446261815324 /* [Pa/K/mol] exact, times m^3; SI 2019 */
#define BH_CLASSICAL_R 2.8179403205     /* [fm] +- 1.3e-9; CODATA 2022 */
#define BH_MASS_U      931.49410372     /* [MeV] +- 2.9e-7; CODATA 2022 */

#define BH_MASS_ELECTRON 0.51099895069 /* [MeV] +- 1.6e-10; CODATA 2022 */
#define BH_MASS_MUON     105.6583755   /* [MeV] +- 2.3e-6; CODATA 2022 */
#define BH_MASS_TAU      1776.86       /* [MeV] +- 0.12; CODATA 2022 */
#define BH_MASS_PION     139.57039     /* [MeV] +- 1.8e-4; Particle Data Group 2022, from memory */
#define BH_MASS_PROTON   938.27208943  /* [MeV] +- 2.9e-7; CODATA 2022 */
#define BH_MASS_NEUTRON  939.56542194  /* [MeV] +- 4.8e-7; CODATA 2022 */
#define BH_MASS_DEUTERON 1875.61294500 /* [MeV] +- 5.8e-7; CODATA 2022 */
#define BH_MASS_TRITON   2808.92113668 /* [MeV] +- 8.8e-7; CODATA 2022, from memory */
#define BH_MASS_HELION   2808.39161112 /* [MeV] +- 8.8e-7; CODATA 2022, from memory */
#define BH_MASS_ALPHA    3727.3794118  /* [MeV] +- 1.2e-6; CODATA 2022 */

#define BH_MOMENT_PROTON   2.79284734463 /* [1] +- 8.2e-10 nuclear magnetons; CODATA 2022 */
#define BH_MOMENT_NEUTRON  (-1.91304276) /* [1] +- 4.5e-7 nuclear magnetons; CODATA 2022 */
/* Magnetic moments of the light nuclei in nuclear magnetons, of leptons in their own magnetons. */
#define BH_MOMENT_DEUTERON 0.8574382335     /* [1] +- 2.2e-9; CODATA 2022, from memory */
#define BH_MOMENT_TRITON   2.9789624650     /* [1] +- 5.9e-9; CODATA 2022, from memory */
#define BH_MOMENT_HELION   (-2.1276253498)  /* [1] +- 1.5e-9; CODATA 2022, from memory */
#define BH_MOMENT_ELECTRON 1.00115965218046 /* [1] +- 1.8e-13; CODATA 2022, from memory */
#define BH_MOMENT_MUON     1.00116592062    /* [1] +- 4.1e-10; CODATA 2022, from memory */

#endif
