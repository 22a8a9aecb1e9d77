#!/usr/bin/python3
"""Writes tests/physics/kinematics_rows.csv: elastic events to 20 digits.

Each event is the root of |k - k'|^2 = (v + M)^2 - M^2 in the recoil energy v, with the momenta of
both particles as vectors, found by mpmath at 60 digits: conservation of the four-momentum, not the
closed forms of the C source.  Jacobians are numerical derivatives of such roots.  Behind each value
stands its condition number: the sum over mass, target, energy and angle of |x df/dx / f|.
"""
from mpmath import atan2, cos, findroot, mp, mpf, nstr, sin, sqrt

mp.dps = 60
ME, MMU, MP, MD, MA = 0.51099895069, 105.6583755, 938.27208943, 1875.612945, 3727.3794118
MPI, MC, MAU, MPB = 139.57039, 11174.862, 183432.9, 193687.7
NAMES = "scattered_kinetic scattered_momentum recoil_angle recoil_kinetic recoil_momentum s u q2 transverse2 epsilon cm_per_lab scattered_per_recoil".split()


def roots(m, M, T, angle, steps=2):
    """Recoil kinetic energies that conserve four-momentum, rising."""
    E, p, c = T + m, sqrt(T * (T + 2 * m)), cos(angle)
    most = 2 * M * p * p / ((m + M) ** 2 + 2 * M * T)  # head on

    def miss(v):
        e = E - v
        k = sqrt(abs(e * e - m * m))
        return p * p + k * k - 2 * p * k * c - v * (v + 2 * M)

    found, grid = [], sorted({most * mpf(10) ** (mpf(i) / min(steps, 20)) for i in range(-30 * min(steps, 20), 0)} | {most * i / 200 for i in range(1, 200)} | {most * (1 - mpf(10) ** -i) for i in range(3, 40)} | {most * (1 + mpf(10) ** -30)})
    if steps > 400:  # two roots close together: find the lowest point between them first
        i = min(range(1, len(grid) - 1), key=lambda i: miss(grid[i]) / grid[i])
        lo, hi = grid[i - 1], grid[i + 1]
        for _ in range(120):
            a, b = lo + (hi - lo) / 3, hi - (hi - lo) / 3
            lo, hi = (lo, b) if miss(a) / a < miss(b) / b else (a, hi)
        grid = sorted(grid + [lo])
    for lo, hi in zip(grid, grid[1:]):
        if miss(lo) * miss(hi) < 0:
            found.append(findroot(miss, (lo, hi), solver="anderson", tol=mpf(10) ** -90, maxsteps=500, verify=False))
    return found


def recoil(m, M, T, angle, slow):
    wanted = 2 if m > M and angle > 0 else 1
    for steps in (2, 20, 4000):
        found = roots(m, M, T, angle, steps)
        if len(found) == wanted:
            break
    assert len(found) == wanted, (m, M, T, angle, found)
    return found[-1] if slow else found[0]


def vectors(m, M, T, angle, v):
    E, p = T + m, sqrt(T * (T + 2 * m))
    k = sqrt((E - v) ** 2 - m * m)
    r = (p - k * cos(angle), -k * sin(angle))
    g, b = (E + M) / sqrt((E + M) ** 2 - p * p), p / (E + M)
    along = g * (k * cos(angle) - b * (E - v))  # of the scattered, centre of mass
    return E, p, k, r, along / sqrt(along**2 + (k * sin(angle)) ** 2)


def event(m, M, T, angle, slow, deep=True):
    v = recoil(m, M, T, angle, slow)
    E, p, k, r, star = vectors(m, M, T, angle, v)
    q = sqrt(r[0] ** 2 + r[1] ** 2)
    theta = atan2(-r[1], r[0])
    s, u = (E + M) ** 2 - p * p, (M - (E - v)) ** 2 - k * k
    q2 = -((v) ** 2 - q * q)
    big = (s - u) ** 2 - (4 * M * M + q2) * q2
    eps = big / (big + 2 * (4 * M * M + q2) * (q2 - 2 * m * m))
    out = [E - v - m, k, theta, v, q, s, u, q2, (p * sin(theta)) ** 2, eps]
    if deep:
        h = mpf(10) ** -18 * (angle if angle > 0 else 1)
        ends = []
        for x in (angle - h, angle + h):
            w = recoil(m, M, T, x, slow)
            _, _, _, rr, st = vectors(m, M, T, x, w)
            ends.append((st, cos(x), rr[0] / sqrt(rr[0] ** 2 + rr[1] ** 2)))
        d = [b - a for a, b in zip(*ends)]
        out += [abs(d[0] / d[1]), abs(d[1] / d[2])]
    return out


def row(m, M, T, angle, slow):
    x = [mpf(a) for a in (m, M, T, angle)]
    base = event(*x, slow)
    condition = [mpf(0)] * len(base)
    for i in range(4):
        if x[i] == 0:
            continue
        up, down = list(x), list(x)
        h = mpf(10) ** -15
        for j in (0, 1) if m == M and i < 2 else (i,):  # equal masses stay equal
            up[j], down[j] = x[j] * (1 + h), x[j] * (1 - h)
        a, b = event(*up, slow), event(*down, slow)
        condition = [c + abs((p - q) / (2 * h * f)) if f else c for c, p, q, f in zip(condition, a, b, base)]
    cells = [repr(m), repr(M), repr(T), repr(angle), "slow" if slow else "fast"]
    for value, c in zip(base, condition):
        cells += [nstr(value, 20, min_fixed=-5, max_fixed=20), nstr(c, 3)]
    print(",".join(cells), flush=True)


D = 0.017453292519943295
ROWS = []
for T in (1e-3, 0.3, 20.0, 855.0, 4.4e4, 1e6):  # electrons, the slowest and the fastest too
    ROWS += [(ME, MP, T, a * D, 0) for a in (0.001, 21.3, 90.0, 179.9)]
ROWS += [(ME, MPB, 450.0, a * D, 0) for a in (1e-4, 33.0, 180.0)]
ROWS += [(0.0, MP, T, a * D, 0) for T in (1e-3, 855.0, 1e6) for a in (1e-4, 60.0, 179.0)]
ROWS += [(MMU, MP, T, a * D, 0) for T in (1.0, 94.5, 1.6e5) for a in (0.2, 20.0, 100.0, 180.0)]
ROWS += [(MA, MAU, 5.0, a * D, 0) for a in (0.01, 15.0, 165.0)] + [(MA, MC, 2.0, 170 * D, 0)]
ROWS += [(MP, MC, 3.0, 165 * D, 0), (MPI, MP, 60.0, 90 * D, 0), (MD, MA, 12.0, 44 * D, 0)]
ROWS += [(MP, MP, T, a * D, 0) for T in (0.2, 300.0, 1e6) for a in (0.3, 45.0, 89.0)]
ROWS += [(ME, ME, 2200.0, 1.2 * D, 0), (MA, MA, 1.0, 45 * D, 0)]
for m, M, T, angles in [(MMU, ME, 1626.0, (0.05, 0.2, 0.277)), (MA, MP, 5.0, (3.0, 10.0, 14.57)), (MAU, MC, 300.0, (0.5, 3.4)), (MA, MP, 3e6, (1.0, 14.0)), (MD, MP, 1e-3, (5.0, 30.0)), (MPB, ME, 1e4, (1e-6, 1.5e-4))]:
    ROWS += [(m, M, T, a * D, slow) for a in angles for slow in (0, 1)]
ROWS += [(MP * (1 - 1e-9), MP, 10.0, 120 * D, 0), (MP * (1 + 1e-9), MP, 10.0, 30 * D, 1)]

if __name__ == "__main__":
    print("# source: four-momentum conservation solved by mpmath at 60 digits (kinematics_rows.py); MeV, rad")
    print(",".join(["mass", "target", "kinetic", "angle", "branch"] + [c for n in NAMES for c in (n, "condition")]))
    for r in ROWS:
        row(*r)
