/* places.h - where plans and materials are looked for; the only reader of the environment. */
#ifndef BH_COMMAND_PLACES_H
#define BH_COMMAND_PLACES_H

/* The folder that holds plans/ and materials/: share/beamhours beside the installed program's bin,
 * else the source tree the program was built in.  NULL when there is neither (or no memory).
 * The caller frees it. */
char *bh_places_data(void);

/* The shared object that draws, beamhours-draw.so: beside the program, in lib/beamhours beside its
 * bin, or where the installation wrote down that it put it.  NULL when it is nowhere (or no
 * memory). The caller frees it. */
char *bh_places_drawing(void);

/* Folders to look for materials in, NULL-terminated: that of `plan` (NULL or "-": the current one),
 * $BEAMHOURS_MATERIALS, $XDG_DATA_HOME/beamhours/materials, the installed library.  NULL when there
 * is no memory.  Free with bh_places_free. */
char **bh_places_materials(const char *plan);
void bh_places_free(char **folders);

/* Width of the terminal [columns]: $COLUMNS, else the terminal's own, else 80. */
int bh_places_width(void);

#endif
