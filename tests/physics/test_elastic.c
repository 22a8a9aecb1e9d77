/* test_elastic.c - the process "elastic": published and independent cross sections, exchange of
 * identical particles, formulas and caveats in words, the registries. */
#include "../suite.h"

#include <math.h>
#include <string.h>

#include "beamhours/physics/coulomb.h"
#include "beamhours/physics/one_photon.h"
#include "beamhours/physics/process.h"
#include "beamhours/physics/radiative.h"
#include "beamhours/physics/validity.h"
#include "beamhours/units/constants.h"

#define ME BH_MASS_ELECTRON
#define MP BH_MASS_PROTON
#define D  BH_DEGREE
#define NB 1e-3 /* [ub] */
#define MB 1e3  /* [ub] */

static const bh_particle light = {"massless", BH_KIND_LEPTON, -1, 1, 0, 0, 0.0, 0.0};

static bh_particle particle(const char *name)
{
    bh_particle out = light;
    if (strcmp(name, "massless") != 0)
        ck_assert_msg(bh_particle_find(name, &out), "no particle %s", name);
    return out;
}

/* One cross section [ub/sr] through the registry. */
static double one(const bh_encounter *x, double angle)
{
    const bh_collision in = {x->beam->mass, x->target, x->kinetic};
    bh_event e;
    bh_error err = {0};
    ck_assert_msg(bh_kinematics_scattered(&in, angle, BH_BRANCH_FAST, &e, &err) == BH_OK, "%s",
                  err.text);
    double out;
    bh_process_find("elastic")->cross_section(x, 1, &e, &out);
    return out;
}

static bh_structure *structure(const char *name, int z, int a)
{
    bh_error err = {0};
    bh_structure *out = bh_structure_new(name, z, a, &err);
    ck_assert_msg(out, "%s", err.text);
    return out;
}

#define FORM "closed form, mpmath 30 digits"
#define SPIN "closed form = explicit 4x4 Dirac spinor sum"

static const struct {
    const char *beam;
    double momentum, degrees; /* [MeV/c] [deg] */
    int z, a;
    double target; /* [MeV] */
    const char *model;
    double want, tolerance; /* [nb/sr] */
    const char *source;
} rows[] = {
    {"massless", 855.0, 60.0, 1, 1, MP, "dipole", 17.8207314619, 1e-11, FORM},
    {"massless", 855.0, 60.0, 1, 1, MP, "kelly-2004", 17.4940965532, 1e-11, FORM},
    {"massless", 855.0, 60.0, 1, 1, MP, "ye-2018", 17.8232686672, 1e-9, FORM},
    {"massless", 1160.0, 7.9, 1, 1, MP, "dipole", 153507.106295, 1e-11, FORM},
    {"massless", 1160.0, 7.9, 1, 1, MP, "kelly-2004", 151038.302919, 1e-11, FORM},
    {"massless", 1160.0, 7.9, 1, 1, MP, "ye-2018", 150858.569766, 1e-9, FORM},
    {"massless", 2407.0, 41.11, 1, 1, MP, "dipole", 0.953858120079, 1e-11, FORM},
    {"massless", 2407.0, 41.11, 1, 1, MP, "kelly-2004", 1.02837141532, 1e-11, FORM},
    {"massless", 2407.0, 41.11, 1, 1, MP, "ye-2018", 1.06015975102, 1e-9, FORM},
    {"massless", 1511.0, 90.066, 1, 1, MP, "dipole", 0.132557601412, 1e-11, FORM},
    {"massless", 1511.0, 90.066, 1, 1, MP, "kelly-2004", 0.147891670133, 1e-11, FORM},
    {"massless", 1511.0, 90.066, 1, 1, MP, "ye-2018", 0.153208689227, 1e-9, FORM},
    {"muon-", 210.0, 60.0, 1, 1, MP, "kelly-2004", 1486.36242271, 1e-11, SPIN},
    {"muon-", 210.0, 60.0, 1, 1, MP, "dipole", 1521.34359915, 1e-11, SPIN},
    {"muon-", 210.0, 20.0, 1, 1, MP, "kelly-2004", 152380.568147, 1e-11, SPIN},
    {"muon+", 210.0, 20.0, 1, 1, MP, "dipole", 152954.86546, 1e-11, SPIN},
    {"muon-", 115.0, 100.0, 1, 1, MP, "kelly-2004", 1208.92640326, 1e-11, SPIN},
    {"muon-", 115.0, 100.0, 1, 1, MP, "dipole", 1229.12704714, 1e-11, SPIN},
    {"muon-", 115.0, 20.0, 1, 1, MP, "kelly-2004", 771209.381938, 1e-11, SPIN},
    {"muon-", 115.0, 20.0, 1, 1, MP, "dipole", 772102.279458, 1e-11, SPIN},
    {"electron", 210.0, 60.0, 1, 1, MP, "kelly-2004", 1131.1837624, 1e-11, SPIN},
    {"positron", 210.0, 60.0, 1, 1, MP, "dipole", 1157.76897626, 1e-11, SPIN},
    {"muon-", 99999.944182, 0.3, 1, 1, MP, "kelly-2004", 4240036.30607, 1e-8, SPIN},
    {"muon-", 159999.965114, 0.2, 1, 1, MP, "kelly-2004", 7536561.50362, 1e-8, SPIN},
    {"massless", 400.0, 30.0, 1, 2, 1875.612945, "abbott-2000-i", 1892.27912773, 1e-9, FORM},
    {"massless", 400.0, 30.0, 1, 2, 1875.612945, "abbott-2000-ii", 1889.62679028, 1e-9, FORM},
    {"massless", 1000.0, 30.0, 1, 2, 1875.612945, "abbott-2000-i", 8.42436311088, 1e-9, FORM},
    {"massless", 1000.0, 30.0, 1, 2, 1875.612945, "abbott-2000-ii", 8.47341369896, 1e-9, FORM},
};

START_TEST(independent_cross_sections)
{
    const bh_particle beam = particle(rows[_i].beam);
    bh_structure *s = structure(rows[_i].model, rows[_i].z, rows[_i].a);
    const double p = rows[_i].momentum, m = beam.mass;
    const bh_encounter x = {
        &beam, beam.charge, rows[_i].z, rows[_i].a, rows[_i].target, sqrt(p * p + m * m) - m,
        s,     0.0};
    const double got = one(&x, rows[_i].degrees * D) / NB;
    ck_assert_msg(fabs(got / rows[_i].want - 1.0) <= rows[_i].tolerance,
                  "row %d: %.12g nb/sr, want %.12g: %s", _i, got, rows[_i].want, rows[_i].source);
    bh_structure_free(s);
}
END_TEST

#define ROS "Rosenbluth-separation proposal of 2001, kinematics table of the electron"
static const struct {
    double energy, degrees;    /* [MeV] [deg] */
    double published, born;    /* [1e-32 cm2/sr]: with radiation, and recomputed without */
    double slope, published_E; /* [%/deg] and twice [%/%] as printed */
} proposal[] = {
    {1162.0, 40.557, 4.064, 4.59412, 14.7, 8.69},
    {1162.0, 127.062, 1.185e-2, 1.34219e-2, 2.4, 10.07},
    {2262.0, 19.158, 22.17, 25.6419, 33.19, 8.98},
    {2262.0, 38.299, 0.1933, 0.225519, 18.2, 11.77},
    {2262.0, 105.695, 6.077e-4, 7.08815e-4, 3.62, 11.49},
    {3362.0, 12.584, 54.79, 64.1868, 51.2, 9.05},
    {3362.0, 44.541, 5.667e-3, 6.74788e-3, 15.2, 13.06},
    {3362.0, 88.315, 1.228e-4, 1.45995e-4, 4.92, 12.08},
    {5562.0, 7.470, 162.9, 194.02, 87.01, 9.09},
    {5562.0, 13.398, 2.282, 2.75636, 59.89, 12.5},
};

START_TEST(published_plan)
{
    const bh_particle beam = particle("electron");
    bh_structure *s = structure("dipole", 1, 1);
    bh_encounter x = {&beam, -1, 1, 1, MP, proposal[_i].energy - ME, s, 0.0};
    const double angle = proposal[_i].degrees * D, E = proposal[_i].energy, h = 1e-4;
    const double born = one(&x, angle) / 1e-2;
    ck_assert_msg(fabs(born / proposal[_i].born - 1.0) < 1e-4, "%.6g: %s", born, ROS);
    const double radiation = proposal[_i].published / born;
    ck_assert_msg(radiation > 0.82 && radiation < 0.89, "ratio %.3f: %s", radiation, ROS);
    const double slope = log(one(&x, angle - h * D) / one(&x, angle + h * D)) / (2.0 * h) * 100.0;
    ck_assert_msg(fabs(slope / proposal[_i].slope - 1.0) < 0.01, "%.4g: %s", slope, ROS);
    x.kinetic = E * (1.0 - h) - ME;
    const double low = one(&x, angle);
    x.kinetic = E * (1.0 + h) - ME;
    const double per_E = log(low / one(&x, angle)) / (2.0 * h);
    ck_assert_msg(fabs(2.0 * per_E / proposal[_i].published_E - 1.0) < 0.02, "%.4g: %s", per_E,
                  ROS);
    bh_structure_free(s);
}
END_TEST

/* Own calculation of the nonrelativistic formula; the exact one differs by v^2/c^2. */
#define MOTT30 "identical particles by Mott 1930, own nonrelativistic calculation"
static const struct {
    const char *beam;
    int z, a;
    double kinetic, degrees, want; /* [MeV] [deg] [mb/sr] */
} twins[] = {
    {"alpha", 2, 4, 1.0, 30.0, 5675.192084},  {"alpha", 2, 4, 1.0, 45.0, 3753.431775},
    {"12C", 6, 12, 5.0, 45.0, 12161.11895},   {"12C", 6, 12, 5.0, 30.0, 6868.759292},
    {"proton", 1, 1, 0.2, 45.0, 1466.184287}, {"16O", 8, 16, 8.0, 45.0, 15013.7271},
};

START_TEST(identical_particles)
{
    const bh_particle beam = particle(twins[_i].beam);
    bh_structure *s = structure("point", twins[_i].z, twins[_i].a);
    const bh_encounter x = {&beam,     beam.charge,       twins[_i].z, twins[_i].a,
                            beam.mass, twins[_i].kinetic, s,           0.0};
    const double got = one(&x, twins[_i].degrees * D) / MB;
    ck_assert_msg(fabs(got / twins[_i].want - 1.0) < 2e-3, "%s: %.10g mb/sr, want %.10g: %s",
                  beam.name, got, twins[_i].want, MOTT30);
    /* seen from the other one it is the same in the centre of mass */
    const double a = 0.3, ja = 4.0 * cos(a), jb = 4.0 * sin(a);
    const double other = one(&x, 0.5 * BH_PI - a) / jb;
    ck_assert_double_eq_tol(one(&x, a) / ja, other, 3e-2 * other);
    bh_structure_free(s);
}
END_TEST

START_TEST(hadrons_are_rutherford_when_slow)
{
    static const struct {
        const char *beam;
        int z, a;
        double target, kinetic, tolerance;
    } slow[] = {
        {"alpha", 79, 197, 183432.9, 0.5, 2e-3},  {"proton", 79, 197, 183432.9, 0.1, 2e-3},
        {"pion+", 79, 197, 183432.9, 0.01, 2e-3}, {"12C", 82, 208, 193687.7, 3.0, 2e-3},
        {"deuteron", 6, 12, 11174.86, 0.1, 2e-3}, {"alpha", 1, 1, MP, 0.1, 2e-3},
    };
    for (int i = 0; i < COUNT(slow); i++) {
        const bh_particle beam = particle(slow[i].beam);
        bh_structure *s = structure("point", slow[i].z, slow[i].a);
        const bh_encounter x = {&beam,          beam.charge,     slow[i].z, slow[i].a,
                                slow[i].target, slow[i].kinetic, s,         0.0};
        const bh_collision in = {beam.mass, slow[i].target, slow[i].kinetic};
        const double angle = 0.7 * bh_kinematics_largest_angle(&in);
        bh_event e;
        ck_assert_int_eq(bh_kinematics_scattered(&in, angle, BH_BRANCH_FAST, &e, NULL), BH_OK);
        const double want = bh_rutherford(&in, &e, beam.charge * slow[i].z);
        ck_assert_double_eq_tol(one(&x, angle) / want, 1.0, slow[i].tolerance);
        bh_structure_free(s);
    }
}
END_TEST

START_TEST(many_at_once_are_the_same)
{
    const bh_particle beam[] = {particle("electron"), particle("proton")};
    bh_structure *s = structure("kelly-2004", 1, 1);
    for (int b = 0; b < 2; b++) {
        const bh_encounter x = {&beam[b], beam[b].charge, 1, 1, MP, 300.0, s, 0.0};
        const bh_collision in = {beam[b].mass, MP, 300.0};
        bh_event e[192] = {{0}}; /* nothing is written behind the 150th */
        double angle[150], got[192];
        for (int i = 150; i < 192; i++)
            got[i] = -7.0;
        for (int i = 0; i < 150; i++)
            angle[i] = 0.01 * (i + 1);
        bh_kinematics_batch(&in, 150, angle, BH_BRANCH_FAST, e);
        bh_process_find("elastic")->cross_section(&x, 150, e, got);
        for (int i = 0; i < 150; i++)
            ck_assert(got[i] == one(&x, angle[i]));
        for (int i = 150; i < 192; i++)
            ck_assert(got[i] == -7.0);
    }
    bh_structure_free(s);
}
END_TEST

static const struct {
    const char *beam;
    int z, a;
    double target, kinetic, degrees; /* [MeV] [MeV], and of the arm */
    const char *formula;             /* words of it */
    const char *caveat;              /* words of it; NULL: none */
} spoken[] = {
    {"electron", 1, 1, MP, 855.0, 0.0, "Rosenbluth", NULL},
    {"electron", 1, 2, 1875.6, 855.0, 0.0, "A(Q2) and B(Q2)", NULL},
    {"muon-", 82, 208, 193687.7, 200.0, 0.0, "Z^2 F(q)^2", NULL},
    {"electron", 2, 3, 2808.4, 845.0, 0.0, "Rosenbluth", NULL},
    {"alpha", 79, 197, 183432.9, 5.0, 0.0, "slow: Rutherford", NULL},
    {"alpha", 79, 197, 183432.9, 5.0, 10.0, "slow", NULL},
    {"alpha", 79, 197, 183432.9, 5.0, 9.5, "slow", "forward of about 9.8 deg"},
    {"alpha", 79, 197, 183432.9, 21.0, 0.0, "slow", "above about 20.1 MeV (Bozoian et al. 1990)"},
    {"alpha", 8, 16, 14895.08, 2.3, 0.0, "slow", NULL},
    {"alpha", 8, 16, 14895.08, 2.5, 0.0, "slow", "above about 2.4 MeV"},
    {"alpha", 79, 197, 183432.9, 2.0, 0.0, "slow", "more than 1 % at every angle"},
    {"alpha", 79, 197, 183432.9, 3.6, 0.0, "slow", "forward of about"},
    {"proton", 14, 28, 26053.2, 3.0, 0.0, "magnetic moment",
     "above about 1.18 MeV (Bozoian et al. 1990, unconfirmed)"},
    {"proton", 6, 12, 11174.86, 3.0, 0.0, "magnetic moment", "5 fm apart, Cline 1986"},
    {"proton", 6, 12, 11174.86, 0.8, 0.0, "magnetic moment", NULL},
    {"7Li", 14, 28, 26053.2, 7.0, 0.0, "point charge", "above about 6.02 MeV"},
    {"alpha", 2, 4, BH_MASS_ALPHA, 0.5, 0.0, "exchange (Mott 1930)", NULL},
    {"12C", 82, 208, 193687.7, 100.0, 0.0, "point charge", "Cline 1986"},
    {"pion-", 6, 12, 11174.86, 20.0, 0.0, "point charge", "at every energy (no repulsion"},
    {"proton", 0, 1, 939.565, 20.0, 0.0, "magnetic moment", "no repulsion keeps the two apart"},
    {"proton", 6, 12, 11174.86, 12.0, 0.0, "magnetic moment", "1986); this far above it"},
    {"pion-", 6, 12, 11174.86, 20.0, 0.0, "point charge", "apart); this far above it"},
    {"electron", 79, 197, 183432.9, 0.005, 0.0, "Rosenbluth", "below 10 keV"},
    {"electron", 79, 197, 183432.9, 0.05, 0.0, "Rosenbluth", "1 % forward of about 67 deg"},
    {"electron", 79, 197, 183432.9, 2.0, 5.0, "Rosenbluth", "1 % forward of about 5.9 deg"},
    {"muon+", 1, 1, MP, 0.005, 0.0, "Rosenbluth", NULL},
};

START_TEST(formula_and_caveat_in_words)
{
    const bh_particle beam = particle(spoken[_i].beam);
    const bh_encounter x = {&beam,        beam.charge,           spoken[_i].z,
                            spoken[_i].a, spoken[_i].target,     spoken[_i].kinetic,
                            NULL,         spoken[_i].degrees * D};
    const bh_process *elastic = bh_process_find("elastic");
    const char *formula = elastic->formula(&x);
    ck_assert_msg(strstr(formula, spoken[_i].formula), "row %d: %s", _i, formula);
    char text[512] = "", small[8] = "";
    const int length = elastic->caveat(&x, text, sizeof text);
    ck_assert_int_eq(length, (int)strlen(text));
    ck_assert_int_eq(elastic->caveat(&x, NULL, 0), length);
    ck_assert_int_eq(elastic->caveat(&x, small, sizeof small), length);
    ck_assert_int_eq(strncmp(small, text, 7), 0);
    if (!spoken[_i].caveat)
        ck_assert_msg(length == 0, "row %d: %s", _i, text);
    else
        ck_assert_msg(strstr(text, spoken[_i].caveat), "row %d: %s", _i, text);
}
END_TEST

/* Measured upper limits of Rutherford behaviour of alphas: Cheng et al. 1993, 1994. */
START_TEST(nuclear_limit_of_alphas)
{
    static const struct {
        int z;
        double measured; /* [MeV] */
    } cheng[] = {{8, 2.35}, {9, 2.6}, {12, 3.2}, {13, 3.6}, {14, 3.8}, {17, 4.5}};
    const bh_particle alpha = particle("alpha");
    for (int i = 0; i < COUNT(cheng); i++) {
        const bh_encounter x = {&alpha, 2, cheng[i].z, 2 * cheng[i].z, 2e4, 1.0, NULL, 0.0};
        ck_assert_double_eq_tol(bh_validity_nuclear(&x).kinetic / cheng[i].measured, 1.03, 0.035);
    }
}
END_TEST

/* Ions: nuclei 5 fm apart do not touch (Cline, Annu. Rev. Nucl. Part. Sci. 36 (1986) 683): 1.25
 * (A1^1/3
 * + A2^1/3) + 5 fm is 15.56 fm for 16O on 208Pb by hand, where the charges have 1.44 x 8 x 82
 * / 15.56 = 60.7 MeV in the centre of mass. */
START_TEST(nuclear_limit_of_ions)
{
    const bh_particle oxygen = particle("16O");
    const bh_encounter x = {&oxygen, 8, 82, 208, 193687.7, 60.0, NULL, 0.0};
    const double distance = 1.25 * (2.5198421 + 5.9249921) + 5.0;
    const double wanted = 1.439964548 * 8 * 82 / distance * (1.0 + oxygen.mass / 193687.7);
    ck_assert_double_eq_tol(bh_validity_nuclear(&x).kinetic / wanted, 1.0, 1e-7);
}
END_TEST

/* Against Andersen et al. 1980 itself, and against the screening of a measured fit. */
START_TEST(screening_starts_where_andersen_says)
{
    const bh_particle alpha = particle("alpha");
    const bh_encounter x = {&alpha, 2, 79, 197, 183432.9, 4.0, NULL, 0.0};
    const double angle = bh_validity_screening(&x);
    const double v = 0.04873e-3 * 2 * 79 * sqrt(pow(2, 2. / 3) + pow(79, 2. / 3)) / 4.0;
    const double bend = v / (2.0 * sin(0.5 * angle)), top = 1.0 + 0.5 * v;
    ck_assert_double_eq_tol(top * top / ((1.0 + v + bend * bend) * (1.0 + v + bend * bend)), 0.99,
                            1e-12);
    const bh_encounter fast = {&alpha, 2, 79, 197, 183432.9, 1e5, NULL, 0.0};
    ck_assert(bh_validity_screening(&fast) < 1e-3);
}
END_TEST

/* Closest approach of a Coulomb orbit, zZe2 / 2T (1 + 1/sin(theta/2)), slow and on a heavy nucleus,
 * against the distance at which the energy of bh_validity_nuclear is head on. */
START_TEST(forward_orbits_stay_away_from_nuclei)
{
    static const struct {
        const char *beam;
        double kinetic, degrees; /* [MeV] and c.m. */
        double limit;            /* [MeV] head on; Bozoian et al. 1990, or Cline 1986 by hand */
        int sign;                /* of what is added to 1/sin(theta/2) */
    } orbits[] = {
        {"alpha", 30.0, 180.0, 0.25 * 79 + 0.4, 1}, {"alpha", 30.0, 40.0, 0.25 * 79 + 0.4, 1},
        {"alpha", 60.0, 10.0, 0.25 * 79 + 0.4, 1},  {"proton", 20.0, 90.0, 0.12 * 79 - 0.5, 1},
        {"pion-", 20.0, 60.0, 9.269, -1},           {"pion-", 2.0, 20.0, 9.269, -1},
    };
    for (int i = 0; i < COUNT(orbits); i++) {
        const bh_particle beam = particle(orbits[i].beam);
        const bh_encounter x = {&beam,    beam.charge,       79,   197,
                                183432.9, orbits[i].kinetic, NULL, 0.0};
        const bh_collision in = {beam.mass, x.target, x.kinetic};
        const double half = sin(0.5 * orbits[i].degrees * D);
        const double q2 = bh_kinematics_largest_q2(&in) * half * half;
        const double wanted = 2.0 * x.kinetic / (orbits[i].limit * (1.0 / half + orbits[i].sign));
        ck_assert_double_eq_tol(bh_validity_excess(&x, q2) / wanted, 1.0, 2e-3);
    }
    const bh_particle pion = particle("pion-"), electron = particle("electron");
    const bh_encounter attracted = {&pion, -1, 79, 197, 183432.9, 1.0, NULL, 0.0};
    const bh_encounter lepton = {&electron, -1, 79, 197, 183432.9, 500.0, NULL, 0.0};
    ck_assert(isinf(bh_validity_excess(&attracted, 0.0)));
    ck_assert(bh_validity_excess(&lepton, 0.0) == 0.0);
}
END_TEST

/* Above the barrier, where there is something to excite or energy for a pion (279.7 MeV for
 * protons on protons, Particle Data Group). */
START_TEST(hadrons_react_above_the_barrier)
{
    static const struct {
        const char *beam;
        int z, a;
        double target, kinetic;
        bool reacts;
    } rows_[] = {
        {"proton", 6, 12, 11174.86, 12.0, true},  {"proton", 6, 12, 11174.86, 0.9, false},
        {"proton", 1, 1, MP, 12.0, false},        {"proton", 1, 1, MP, 279.0, false},
        {"proton", 1, 1, MP, 280.0, true},        {"2H", 1, 1, MP, 10.0, true},
        {"alpha", 79, 197, 183432.9, 5.0, false}, {"pion-", 1, 1, MP, 80.0, false},
        {"pion-", 1, 1, MP, 200.0, true},         {"electron", 6, 12, 11174.86, 500.0, false},
        {"muon-", 6, 12, 11174.86, 500.0, false}, {"pion-", 6, 12, 11174.86, 1.0, true},
    };
    for (int i = 0; i < COUNT(rows_); i++) {
        const bh_particle beam = particle(rows_[i].beam);
        const bh_encounter x = {&beam,           beam.charge,      rows_[i].z, rows_[i].a,
                                rows_[i].target, rows_[i].kinetic, NULL,       0.0};
        ck_assert_msg(bh_validity_reacts(&x) == rows_[i].reacts, "row %d", i);
    }
}
END_TEST

START_TEST(registries)
{
    ck_assert_ptr_eq(bh_process_find("elastic"), bh_process_at(0));
    ck_assert_ptr_null(bh_process_find("elastik"));
    ck_assert_ptr_null(bh_process_find(NULL));
    ck_assert(!bh_process_at(-1) && !bh_process_at(1));
    for (int i = 0; bh_process_at(i); i++)
        ck_assert(bh_process_at(i)->summary[0] && bh_process_at(i)->source[0]);

    ck_assert_ptr_eq(bh_coulomb_find("plane-wave"), bh_coulomb_at(0));
    ck_assert_ptr_eq(bh_coulomb_find("default"), bh_coulomb_find(NULL));
    ck_assert_ptr_null(bh_coulomb_find("partial-wave"));
    ck_assert(!bh_coulomb_at(-1) && !bh_coulomb_at(1));
    const bh_coulomb *wave = bh_coulomb_find(NULL);
    ck_assert(wave->summary[0] && wave->source[0] && wave->range[0]);

    ck_assert_ptr_eq(bh_radiative_find("none"), bh_radiative_at(0));
    ck_assert_ptr_eq(bh_radiative_find("default"), bh_radiative_find(NULL));
    ck_assert_ptr_null(bh_radiative_find("peaking"));
    ck_assert(!bh_radiative_at(-1) && bh_radiative_at(1));
    const bh_radiative *none = bh_radiative_find(NULL);
    ck_assert(none->summary[0] && none->source[0] && none->range[0]);
}
END_TEST

START_TEST(plane_waves_change_nothing_but_say_so)
{
    const bh_particle electron = particle("electron"), alpha = particle("alpha");
    const bh_encounter lead = {&electron, -1, 82, 208, 193687.7, 450.0, NULL, 0.0};
    const bh_encounter carbon = {&electron, -1, 6, 12, 11174.86, 450.0, NULL, 0.0};
    const bh_encounter ion = {&alpha, 2, 82, 208, 193687.7, 5.0, NULL, 0.0};
    const bh_event none[3] = {{0}};
    double factor[3] = {0.0}, kept[3] = {0.0};
    bh_coulomb_find(NULL)->factor(&lead, 3, none, factor);
    bh_radiative_find(NULL)->factor(&lead, 10.0, 3, none, kept);
    for (int i = 0; i < 3; i++)
        ck_assert(factor[i] == 1.0 && kept[i] == 1.0);
    char text[256] = "";
    ck_assert_int_gt(bh_coulomb_find(NULL)->caveat(&lead, text, sizeof text), 0);
    ck_assert_msg(strstr(text, "charge 82") && strstr(text, "47 %"), "%s", text);
    ck_assert_int_eq(bh_coulomb_find(NULL)->caveat(&carbon, text, sizeof text), 0);
    ck_assert_int_eq(bh_coulomb_find(NULL)->caveat(&ion, text, sizeof text), 0);
}
END_TEST

int main(void)
{
    TCase *tests = tcase_create("elastic");
    tcase_add_loop_test(tests, independent_cross_sections, 0, COUNT(rows));
    tcase_add_loop_test(tests, published_plan, 0, COUNT(proposal));
    tcase_add_loop_test(tests, identical_particles, 0, COUNT(twins));
    tcase_add_test(tests, hadrons_are_rutherford_when_slow);
    tcase_add_test(tests, many_at_once_are_the_same);
    tcase_add_loop_test(tests, formula_and_caveat_in_words, 0, COUNT(spoken));
    tcase_add_test(tests, nuclear_limit_of_alphas);
    tcase_add_test(tests, nuclear_limit_of_ions);
    tcase_add_test(tests, forward_orbits_stay_away_from_nuclei);
    tcase_add_test(tests, hadrons_react_above_the_barrier);
    tcase_add_test(tests, screening_starts_where_andersen_says);
    tcase_add_test(tests, registries);
    tcase_add_test(tests, plane_waves_change_nothing_but_say_so);
    return run_suite("physics/elastic", tests);
}
