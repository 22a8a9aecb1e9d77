/* vavilov_modes.h - most probable value and width of Vavilov's distribution, worked out once. */
#ifndef BH_MATTER_VAVILOV_MODES_H
#define BH_MATTER_VAVILOV_MODES_H

enum { BH_VAVILOV_KAPPAS = 25, BH_VAVILOV_BETAS = 5 };

/* At kappa = 10^(-2 + i/8) and beta^2 = j/4: the lambda of the maximum, and the full width at half
 * maximum in lambda. */
typedef struct {
    double mode;  /* [1] */
    double width; /* [1] */
} bh_vavilov_mode;

extern const bh_vavilov_mode bh_vavilov_modes[BH_VAVILOV_KAPPAS][BH_VAVILOV_BETAS];

#endif
