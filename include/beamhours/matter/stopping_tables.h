/* stopping_tables.h - published tables of energy loss, as printed. */
#ifndef BH_MATTER_STOPPING_TABLES_H
#define BH_MATTER_STOPPING_TABLES_H

/* What a column is of: an element by its Z (carbon is graphite, gases are gases), or one of these.
 */
enum {
    BH_STOPPING_AMORPHOUS = 106, /* carbon as evaporated */
    BH_STOPPING_AIR = 201,
    BH_STOPPING_WATER,
    BH_STOPPING_POLYETHYLENE,
    BH_STOPPING_MYLAR,
    BH_STOPPING_KAPTON,
    BH_STOPPING_SILICA,
    BH_STOPPING_CSI
};

enum {
    BH_PROTON_ROWS = 43,
    BH_PROTON_COLUMNS = 31,
    BH_ALPHA_ROWS = 25,
    BH_ALPHA_COLUMNS = 30,
    BH_RADIATION_ROWS = 13,
    BH_RADIATION_COLUMNS = 28,
    BH_SLOW_ELEMENTS = 92
};

/* Protons: ICRU Report 49 (1993), PSTAR; 1 to 2 % above 0.5 MeV, 5 % at 0.1 MeV, 10 % at 10 keV. */
extern const int bh_proton_stopping_column[BH_PROTON_COLUMNS];
extern const double bh_proton_stopping_energy[BH_PROTON_ROWS];             /* [MeV] kinetic */
extern const double bh_proton_stopping[BH_PROTON_ROWS][BH_PROTON_COLUMNS]; /* [MeV cm2/g] */

/* Alphas: ICRU Report 49 (1993), ASTAR; 2 % above 2 MeV, 5 % at 0.5 MeV. */
extern const int bh_alpha_stopping_column[BH_ALPHA_COLUMNS];
extern const double bh_alpha_stopping_energy[BH_ALPHA_ROWS];            /* [MeV] kinetic */
extern const double bh_alpha_stopping[BH_ALPHA_ROWS][BH_ALPHA_COLUMNS]; /* [MeV cm2/g] */

/* Radiation of electrons: Seltzer and Berger, Nucl. Instr. Meth. B 12 (1985) 95, ESTAR; 5 % below
 * 2 MeV, 2 to 3 % above. */
extern const int bh_electron_radiation_column[BH_RADIATION_COLUMNS];
extern const double bh_electron_radiation_energy[BH_RADIATION_ROWS]; /* [MeV] kinetic */
/* [MeV cm2/g] */
extern const double bh_electron_radiation[BH_RADIATION_ROWS][BH_RADIATION_COLUMNS];

/* Coefficients A1 .. A5 for Z = 1 .. 92 of ICRU Report 49's fit to slow protons (below 0.5 MeV):
 * [1] each in the units of that fit. */
extern const double bh_proton_slow[BH_SLOW_ELEMENTS][5];

#endif
