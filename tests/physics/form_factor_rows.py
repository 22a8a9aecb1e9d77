#!/usr/bin/python3
"""Writes form_factor_rows.csv: published fits at 30 digits from form_factor_fits.csv.

Each form is written down here from the publication, apart from the C source.
"""
import csv
import re

from mpmath import cos, exp, log10, mp, mpf, nstr, power, sin, sqrt

mp.dps = 30
header = open("include/beamhours/units/constants.h").read()


def constant(name):
    return mpf(re.search(rf"#define BH_{name} +\(?(-?[0-9.e-]+)", header).group(1))


MP, MN = constant("MASS_PROTON") / 1000, constant("MASS_NEUTRON") / 1000
MU = {"p": constant("MOMENT_PROTON"), "n": constant("MOMENT_NEUTRON")}
HBARC = constant("HBARC") / 1000  # GeV fm

fits = {}
for row in csv.reader(line for line in open("tests/physics/form_factor_fits.csv") if line[0] != "#"):
    fits.setdefault((row[0], row[1]), {})[row[2]] = mpf(row[3])


def dipole(q2):
    return 1 / (1 + q2 / mpf("0.71")) ** 2


def series(c, letter, x):
    return sum(v * x ** int(k[len(letter):]) for k, v in c.items() if re.fullmatch(letter + r"\d+", k))


def ratio(c, x):
    return (1 + series(c, "a", x)) / (1 + series(c, "b", x))


def ye(c, q2):
    cut, t0 = 4 * mpf("0.13957") ** 2, mpf("-0.7")
    z = (sqrt(cut + q2) - sqrt(cut - t0)) / (sqrt(cut + q2) + sqrt(cut - t0))
    return series(c, "a", z)


def ye_sigma(c, q2):
    x = log10(q2)
    if q2 < mpf("1e-3"):
        y = c["L0"] + c["L1"] * x
    elif q2 <= 100:
        y = series(c, "M", x)
    else:
        y = c["H0"] * sqrt(x - c["H1"]) + c["H2"]
    return power(10, y) * dipole(q2)


def gaussians(c, q2):
    q, g2 = sqrt(q2) / HBARC, mpf("0.64") / mpf("1.5")
    n = sum(1 for k in c if re.fullmatch(r"Q\d+", k))
    total = sum(c[f"Q{i}"] for i in range(1, n + 1))
    up = mpf(0)
    for i in range(1, n + 1):
        r = c[f"R{i}_fm"]
        up += c[f"Q{i}"] / (1 + 2 * r * r / g2) * (cos(q * r) + 2 * r * r / g2 * sin(q * r) / (q * r))
    return exp(-q * q * g2 / 4) * up / total


ROWS = []


def say(fit, z, a, factor, q2, value):
    ROWS.append(f"{fit},{z},{a},{factor},{q2},{nstr(value, 16, min_fixed=0, max_fixed=0)}")


for text in ["0.0004", "0.03", "0.3", "1.5", "6", "25", "150"]:
    q2 = mpf(text)
    tau = q2 / (4 * MP * MP)
    for fit in ["kelly-2004", "amt-2007", "amt-2007-effective", "venkat-2011"]:
        say(fit, 1, 1, "GE", text, ratio(fits[fit, "GEp"], tau))
        say(fit, 1, 1, "GM", text, MU["p"] * ratio(fits[fit, "GMp/mu_p"], tau))
    kelly = fits["kelly-2004", "GEn"]
    say("kelly-2004", 0, 1, "GE", text, kelly["A"] * tau / (1 + kelly["B"] * tau) * dipole(q2))
    say("kelly-2004", 0, 1, "GM", text, MU["n"] * ratio(fits["kelly-2004", "GMn/mu_n"], tau))
    for name, factor, scale in [("GEp", "GE", 1), ("GMp/mu_p", "GM", MU["p"])]:
        c = fits["arrington-2004", name]
        say("arrington-2004", 1, 1, factor, text,
            scale / (1 + sum(v * q2 ** (int(k[1:]) // 2) for k, v in c.items())))
    for nucleon, z in [("p", 1), ("n", 0)]:
        for name, factor, scale in [(f"GE{nucleon}", "GE", 1), (f"GM{nucleon}/mu_{nucleon}", "GM", MU[nucleon])]:
            say("ye-2018", z, 1, factor, text, scale * ye(fits["ye-2018", name], q2))
            say("ye-2018", z, 1, "sigma " + factor, text, abs(scale) * ye_sigma(fits["Ye2018_error", name], q2))
    c = fits["prad-2019", "GEp"]
    say("prad-2019", 1, 1, "GE", text, (1 + c["p1_GeV-2"] * q2) / (1 + c["p2_GeV-2"] * q2))
    neutron = q2 / (4 * MN * MN)
    say("galster-1971", 0, 1, "GE", text, -MU["n"] * neutron / (1 + fits["galster-1971", "GEn"]["eta"] * neutron) * dipole(q2))
    c = fits["riordan-2010", "GEn"]
    say("riordan-2010", 0, 1, "GE", text, series(c, "a", neutron) / (1 + series(c, "b", neutron)) * dipole(q2))
    say("dipole", 1, 1, "GE", text, dipole(q2))
    say("dipole", 0, 1, "GM", text, MU["n"] * dipole(q2))
    if q2 < 3:
        for fit, z in [("3H_Amroun1994", 1), ("3He_Amroun1994", 2)]:
            say("amroun-1994", z, 3, "F_ch", text, gaussians(fits[fit, "F_charge"], q2))
            say("amroun-1994", z, 3, "F_m", text, gaussians(fits[fit, "F_mag"], q2))

with open("tests/physics/form_factor_rows.csv", "w") as out:
    out.write("# source: form_factor_rows.py, 30 digits, from the published coefficients in form_factor_fits.csv\n")
    out.write("model,z,a,factor,Q2_GeV2,value\n")
    out.write("\n".join(ROWS) + "\n")
