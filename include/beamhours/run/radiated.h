/* radiated.h - what radiation leaves of elastic events inside what an arm takes, angle by angle. */
#ifndef BH_RUN_RADIATED_H
#define BH_RUN_RADIATED_H

#include <stdbool.h>
#include <stddef.h>

#include "beamhours/physics/radiative.h"
#include "beamhours/run/angle_nodes.h"
#include "beamhours/run/channel.h"
#include "beamhours/run/passage.h"

/* Kinetic energies of the detected particle at the scattering point that an arm takes. */
typedef struct {
    double cut;  /* [MeV] below the elastic line of the scatterer at each angle; infinite: none */
    double from; /* [MeV] from bite or threshold, with what is lost on the way out; 0: all */
    double to;   /* [MeV] likewise; infinite: all */
    double blur; /* [MeV] rms with which energies at these ends are measured */
    bool given;  /* there is a cut or a bite */
} bh_gate;

/* Whose events, where in the target, as seen by what. */
typedef struct {
    const bh_radiative *model;
    bh_channel channel; /* at the mean energy of the beam where these nuclei are */
    bh_channel line;    /* the scatterer's, from which the cut counts */
    bh_gate gate;
    bool signal;               /* nuclei of the scatterer itself: all inside the cut is theirs */
    bool trace;                /* so few that 1e-3 of them is enough */
    bool unboosted;            /* other momenta of the beam are not asked for */
    bh_interval polar;         /* [rad] the angles of interest */
    const bh_way *way;         /* NULL: nothing is in the way */
    const bh_vertex *vertices; /* where the nuclei are */
    size_t count;              /* of vertices */
} bh_radiated_request;

/* Everything at one angle. */
typedef struct {
    double cut;                  /* [MeV] that the elastic line lies above the lower edge, as far as
                                    it is measured there */
    bool by_bite;                /* the bite is tighter there than the energy cut */
    double above;                /* [MeV] that it lies above the upper edge */
    double soft;                 /* [MeV] largest loss that is soft: 3 % of the scattered energy; of
                                    a signal all that can be lost */
    bh_event event;              /* elastic */
    bh_radiative_parts internal; /* of the cut, no larger than `soft` */
    double internal_factor;      /* [1] made of them */
    double external, ionisation; /* [1] [1] kept in spite of either in the target, mean */
    double before, after;        /* [1] radiation lengths crossed, mean */
    double factor;               /* [1] product; 0 where the line is below the edge */
} bh_radiated_detail;

/* The factor as a function of the angle: its logarithm is a polynomial of second degree in the
 * logarithm of the cut, with coefficients that are polynomials in ln(1 - cos theta).  Plain value;
 * thread safe. */
typedef struct {
    bool idle;   /* the factor is 1 everywhere */
    bool signal; /* what the upper edge cuts off is not looked at */
    double
        boosted[BH_BOOSTS]; /* [1] how much more it is at a momentum of the beam that much more */
    double largest;         /* [rad] beyond it there is no event */
    bh_angle_nodes at;      /* the angles of what follows */
    double reference;       /* [MeV] of the logarithms */
    double blur;            /* [MeV] rms of the edges of the bite */
    double level[3][BH_ANGLE_NODES]; /* [1] degrees 0, 1, 2 */
    double tail[BH_ANGLE_NODES];     /* [MeV] of single collisions: 1 - tail / cut is kept */
    double cut[BH_ANGLE_NODES];      /* [MeV] below the line, from the gate's energies */
    double limit[BH_ANGLE_NODES];    /* [MeV] the same, from the energy cut */
    double above[BH_ANGLE_NODES];    /* [MeV] of the line over the upper edge */
    double shift[BH_BOOSTS][BH_ANGLE_NODES]; /* [MeV] of the line with the beam's momentum */
    double soft[BH_ANGLE_NODES];             /* [MeV] largest loss that is soft */
} bh_radiated;

/*
 * Fills `out`.  The factor is
 *   internal (radiative.h) x external (bremsstrahlung.h, mean over the vertices) x (1 - tail /
 * cut), at each angle for the cut there: the tighter of the energy cut and of how far the elastic
 * line is above the lower edge of the bite, so that no loss counts twice: kept_fraction says
 * whether the line itself is inside, the factor what of its tail is.  Under a resolution the cut to
 * the edge of the bite is blur x ln(1 + exp(cut / blur)), what a line near the edge may lose on
 * average where it is counted (its share left is good to 2 % within one blur of the edge).  Idle
 * for the model "none", beams that are no leptons, and arms with neither cut nor bite.  1e-5 of the
 * same without the polynomials.
 */
void bh_radiated_make(const bh_radiated_request *request, bh_radiated *out);

/*
 * Multiplies value [ub/sr], n of them, at polar angles theta [rad] by the factor, at one of the
 * beam's momenta (`boost`: BH_AS_IT_IS, or for a signal the other two).  Of background
 * nuclei (not signal) what is beyond the upper edge of the gate is taken off: F(down to the lower
 * edge) - F(down to the upper edge), each times the share of the line that is measured above that
 * edge, soft losses only; harder ones are bh_elastic_tail's.
 */
void bh_radiated_apply(const bh_radiated *radiated, int boost, size_t n, const double *theta,
                       double *value);

enum { BH_RADIATED_KINKS = 2 };

/* Fills kinks [rad], room for BH_RADIATED_KINKS, rising, with the angles within `polar` [rad] where
 * the tighter of energy cut and bite becomes the other one.  Returns how many. */
int bh_radiated_kinks(const bh_radiated *radiated, int boost, bh_interval polar, double *kinks);

/* Fills `out` for polar `angle` [rad].  False where there is no such event. */
bool bh_radiated_at(const bh_radiated_request *request, double angle, bh_radiated_detail *out);

/* Returns [MeV] the lowest kinetic energy that the gate takes at polar `angle` [rad]; infinite
 * where the scatterer's line does not reach that angle and the cut counts from it. */
double bh_gate_from(const bh_gate *gate, const bh_channel *line, double angle);

/* Returns [MeV] what a line `cut` [MeV] above an edge may lose where it is measured above it, with
 * rms `blur` [MeV]. */
double bh_gate_blurred(double cut, double blur);

/* Returns [MeV] the kinetic energy of the detected particle of `event`. */
double bh_channel_kinetic(const bh_channel *channel, const bh_event *event);

#endif
