/* structure_functions.c - ALLM97, NMC95, Bodek 1979, R1990 and R1998 as published. */
#include "beamhours/physics/structure_functions.h"

#include <math.h>

/* Three numbers that make a coefficient run with t. */
typedef struct {
    double a, b, c;
} running;

static double rising(running r, double t)
{
    return r.a + r.b * pow(t, r.c);
}

static double falling(running r, double t)
{
    return r.a + (r.a - r.b) * (1.0 / (1.0 + pow(t, r.c)) - 1.0);
}

/* Pomeron and reggeon; the squares of the paper are done. */
double bh_f2_allm97(double x, double q2)
{
    static const double m0 = 0.31985, mP = 49.457, mR = 0.15052, Q0 = 0.52544, L = 0.06527;
    static const running aP = {-0.0808, -0.44812, 1.1709}, bP = {0.36292, 1.8917, 1.8439},
                         cP = {0.28067, 0.22291, 2.1979}, aR = {0.584, 0.37888, 2.6063},
                         bR = {0.01147, 3.7582, 0.49338}, cR = {0.80107, 0.97307, 3.4942};
    const double t = log(log((q2 + Q0) / L) / log(Q0 / L)), above = q2 * (1.0 - x) / x;
    const double xP = (q2 + mP) / (q2 + mP + above), xR = (q2 + mR) / (q2 + mR + above);
    const double P = falling(cP, t) * pow(xP, falling(aP, t)) * pow(1.0 - x, rising(bP, t));
    const double R = rising(cR, t) * pow(xR, rising(aR, t)) * pow(1.0 - x, rising(bR, t));
    return q2 / (q2 + m0) * (P + R);
}

/* Returns c[0] + c[1] x + ... of n terms. */
static double polynomial(const double *c, int n, double x)
{
    double sum = 0.0;
    for (int i = n - 1; i >= 0; i--)
        sum = sum * x + c[i];
    return sum;
}

typedef struct {
    double a[7], b[4], c[4];
} nmc95;

static double nmc(const nmc95 *fit, double x, double q2)
{
    const double *a = fit->a, *b = fit->b, lambda2 = 0.25 * 0.25;
    const double scale = pow(x, a[0]) * pow(1.0 - x, a[1]) * polynomial(a + 2, 5, 1.0 - x);
    const double slope = b[0] + b[1] * x + b[2] / (x + b[3]);
    const double twist = 1.0 + x * polynomial(fit->c, 4, x) / q2;
    return scale * pow(log(q2 / lambda2) / log(20.0 / lambda2), slope) * twist;
}

double bh_f2_nmc95_proton(double x, double q2)
{
    static const nmc95 fit = {{-0.02778, 2.926, 1.0362, -1.84, 8.123, -13.074, 6.215},
                              {0.285, -2.694, 0.0188, 0.0274},
                              {-1.413, 9.366, -37.79, 47.1}};
    return nmc(&fit, x, q2);
}

double bh_f2_nmc95_deuteron(double x, double q2)
{
    static const nmc95 fit = {{-0.04858, 2.863, 0.8367, -2.532, 9.145, -12.504, 5.473},
                              {-0.008, -2.227, 0.0551, 0.057},
                              {-1.509, 8.553, -31.2, 39.98}};
    return nmc(&fit, x, q2);
}

/* Coefficients of Bodek's table, in his order, from 1 on. */
static const double fitted[25] = {0.0,          1.0741163,   0.75531124,  3.3506491,   1.7447015,
                                  3.5102405,    1.040004,    1.2299128,   0.10625394,  0.48132786,
                                  1.5101467,    0.081661975, 0.65587179,  1.7176216,   0.12551987,
                                  0.7473379,    1.953819,    0.19891522,  -0.17498537, 0.0096701919,
                                  -0.035256748, 3.5185207,   -0.59993696, 4.7615828,   0.41167589};
static const double proton2 = 0.880324; /* [GeV2] his */

/* One Breit-Wigner resonance: its strength, mass, width, spin. */
typedef struct {
    double strength, mass, width;
    int spin;
} resonance;

static double power(double x, int n)
{
    double out = 1.0;
    for (; n > 0; n--)
        out *= x;
    return out;
}

static double breit_wigner(const resonance *r, double w)
{
    static const double radius = 6.08974; /* [1/GeV] */
    const double pion2 = (fitted[1] - 0.938256) * (fitted[1] - 0.938256), M = r->mass;
    const double e = (w * w + proton2 - pion2) / (2.0 * w);
    const double e0 = (M * M - proton2 + pion2) / (2.0 * M);
    const double q = radius * sqrt(fmax(e * e - proton2, 0.0));
    const double q0 = radius * sqrt(fmax(e0 * e0 - pion2, 0.0));
    const int j = 2 * r->spin;
    const double half =
        0.5 * r->width * power(q / q0, j + 1) * (1.0 + power(q0, j)) / (1.0 + power(q, j));
    /* pi and twice the mass as in the program that published the fit */
    return r->strength * half / ((w - M) * (w - M) + half * half) / 3.1415926 / 1.876512;
}

static double resonances(double w, double q2)
{
    static const int spin[4] = {1, 2, 3, 2};
    double sum = 0.0;
    for (int i = 0; i < 4; i++) {
        resonance r = {fitted[6 + 3 * i], fitted[7 + 3 * i], fitted[8 + 3 * i], spin[i]};
        if (i == 0)
            r.strength += q2 * (fitted[18] + q2 * fitted[19]);
        if (i == 2)
            r.mass *= 1.0 + fitted[20] / (1.0 + fitted[21] * q2);
        sum += breit_wigner(&r, w);
    }
    return sum;
}

/* Background and resonances over the smooth curve. */
static double modulation(double w, double q2)
{
    const double x = q2 / (q2 + w * w - proton2), off = x - fitted[24];
    const double step1 = w > fitted[1] ? fitted[2] * -expm1(-fitted[3] * (w - fitted[1])) : 0.0;
    const double step2 =
        w > fitted[4] ? (1.0 - fitted[2]) * -expm1(-fitted[5] * (w - fitted[4]) * (w + fitted[4]))
                      : 0.0;
    const double background = step1 + step2, bend = fitted[22] + fitted[23] * off * off;
    return background * (1.0 + (1.0 - background) * bend) +
           resonances(w, q2) * (1.0 - fitted[2] - step2);
}

/* The smooth curve has five coefficients. */
static double bodek(const double smooth[5], double w, double q2)
{
    const double two_nu = q2 + w * w - proton2; /* times the mass */
    const double omega = (two_nu + 1.642) / (q2 + 0.376), s = 1.0 - 1.0 / omega;
    const double g = s * s * s * polynomial(smooth, 5, s);
    return modulation(w, q2) * g * omega * q2 / two_nu;
}

double bh_f2_bodek79_proton(double w, double q2)
{
    static const double smooth[5] = {0.256, 2.178, 0.898, -6.716, 3.756};
    return bodek(smooth, w, q2);
}

double bh_f2_bodek79_neutron(double w, double q2)
{
    static const double smooth[5] = {0.064, 0.225, 4.106, -7.079, 3.055};
    return bodek(smooth, w, q2);
}

static double transverse_rise(double x, double q2)
{
    return 1.0 + 12.0 * q2 / (q2 + 1.0) * 0.015625 / (0.015625 + x * x);
}

double bh_r_1998(double x, double q2)
{
    static const double a[6] = {0.0485, 0.547, 2.0621, -0.3804, 0.509, -0.0285};
    static const double b[6] = {0.0481, 0.6114, -0.3509, -0.4611, 0.7172, -0.0317};
    static const double c[6] = {0.0577, 0.4644, 1.8288, 12.3708, -43.1043, 41.7415};
    const double rise = transverse_rise(x, q2) / log(q2 / 0.04), q4 = q2 * q2;
    const double a4 = a[2] * a[2] * a[2] * a[2];
    const double A = a[1] / sqrt(sqrt(q4 * q4 + a4)) * (1.0 + x * (a[3] + x * a[4])) * pow(x, a[5]);
    const double B =
        (b[1] / q2 + b[2] / (q4 + 0.09)) * (1.0 + x * (b[3] + x * b[4])) * pow(x, b[5]);
    const double from = q2 - x * (c[3] + x * (c[4] + x * c[5]));
    return ((a[0] + b[0] + c[0]) * rise + A + B + c[1] / sqrt(from * from + c[2] * c[2])) / 3.0;
}

double bh_r_1990(double x, double q2)
{
    static const double a[3] = {0.0672, 0.4671, 1.8979}, b[3] = {0.0635, 0.5747, -0.3534},
                        c[3] = {0.0599, 0.5088, 2.1081};
    const double rise = transverse_rise(x, q2) / log(q2 / 0.04), q4 = q2 * q2, y = 1.0 - x;
    const double A = a[1] / sqrt(sqrt(q4 * q4 + a[2] * a[2] * a[2] * a[2]));
    const double from = q2 - 5.0 * y * y * y * y * y;
    return ((a[0] + b[0] + c[0]) * rise + A + b[1] / q2 + b[2] / (q4 + 0.09) +
            c[1] / sqrt(from * from + c[2] * c[2])) /
           3.0;
}
