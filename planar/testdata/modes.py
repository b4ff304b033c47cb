"""Writes modes.json: random platforms on three legs, and every place in which they
close, by elimination with 60 digits.

A leg is a circle (c: a bar from a fixed pin), a line (l: the platform's pin in a
fixed slot) or a line of the platform (m: a fixed pin in the platform's slot). With the
platform's origin at X and its angle t, the legs ask for

    c  |X + R p - g|^2 = r^2       l  n.(X + R p - g) = 0       m  (R n).(g - X - R p) = 0

Lines, and differences of circles, are linear in X. Two of them give X = N/D, which
makes the remaining leg a trigonometric polynomial of t, of degree 3 at most; of three
lines it is their determinant. Its coefficients come from 32 samples, its roots
z = exp(it) from mpmath.polyroots. Run: python3 modes.py > modes.json
"""
import json
import random
import sys
from itertools import combinations_with_replacement

from mpmath import mp, mpf, mpc, pi, cos, sin, exp, log, polyroots, fabs, hypot, arg

mp.dps = 60


def draw(rng, kinds):
    """Legs that close at a place drawn with them, all numbers with 9 decimals."""
    def normal():
        return round(rng.gauss(0, 1), 9)
    x, y, t = normal(), normal(), round(rng.uniform(-3, 3), 9)
    legs = []
    for kind in kinds:
        px, py = normal(), normal()
        qx = x + float(cos(t)) * px - float(sin(t)) * py
        qy = y + float(sin(t)) * px + float(cos(t)) * py
        if kind == "c":
            gx, gy = normal(), normal()
            legs.append(dict(kind=kind, p=[px, py], g=[gx, gy], r=round(float(hypot(qx - gx, qy - gy)), 9), angle=0))
        else:
            legs.append(dict(kind=kind, p=[px, py], g=[round(qx, 9), round(qy, 9)], r=0, angle=round(rng.uniform(0, 6), 9)))
    return legs


def turned(v, t):
    return (cos(t) * v[0] - sin(t) * v[1], sin(t) * v[0] + cos(t) * v[1])


def rows(legs, t):
    """Linear equations (a, b, c) with a x + b y + c = 0, and a circle or None."""
    lines, circles = [], []
    for leg in legs:
        p = turned([mpf(v) for v in leg["p"]], t)
        g = [mpf(v) for v in leg["g"]]
        k = (p[0] - g[0], p[1] - g[1])
        if leg["kind"] == "c":
            circles.append((k, mpf(leg["r"])))
            continue
        by = mpf(leg["angle"]) + (t if leg["kind"] == "m" else 0)
        n = (-sin(by), cos(by))
        lines.append((n[0], n[1], n[0] * k[0] + n[1] * k[1]))
    for k, r in circles[1:]:
        k0, r0 = circles[0]
        lines.append((2 * (k[0] - k0[0]), 2 * (k[1] - k0[1]),
                      k[0] ** 2 + k[1] ** 2 - r ** 2 - k0[0] ** 2 - k0[1] ** 2 + r0 ** 2))
    return lines, circles[0] if circles else None


def eliminated(legs, t):
    """f(t), and the numerators and denominator of X."""
    lines, circle = rows(legs, t)
    (a, b, c), (d, e, f) = lines[:2]
    den = a * e - b * d
    nx, ny = b * f - c * e, c * d - a * f
    if circle is None:
        g, h, i = lines[2]
        return g * nx + h * ny + i * den, nx, ny, den
    k, r = circle
    return (nx + den * k[0]) ** 2 + (ny + den * k[1]) ** 2 - (r * den) ** 2, nx, ny, den


def solve(legs):
    n = 32
    f = [eliminated(legs, 2 * pi * k / n)[0] for k in range(n)]
    size = max(fabs(v) for v in f)
    coef = {}
    for k in range(-n // 2, n // 2):
        coef[k] = sum(f[i] * exp(mpc(0, -2 * pi * k * i / n)) for i in range(n)) / n
    assert all(fabs(v) < 1e-45 * size for k, v in coef.items() if abs(k) > 3)
    degree = max(k for k in coef if fabs(coef[k]) > 1e-40 * size)
    roots = polyroots([coef[k] for k in range(degree, -degree - 1, -1)], maxsteps=500, extraprec=400)
    places, nearest = [], 1
    for z in roots:
        off = fabs(log(fabs(z)))
        if off > 1e-30:
            nearest = min(nearest, off)
            continue
        t = arg(z)
        _, nx, ny, den = eliminated(legs, t)
        places.append([float(nx / den), float(ny / den), float(t)])
    return len(roots), sorted(places), float(nearest)


def main():
    rng = random.Random(8)
    out = []
    for kinds in combinations_with_replacement("clm", 3):
        for _ in range(24):
            legs = draw(rng, kinds)
            roots, places, nearest = solve(legs)
            out.append(dict(legs=legs, roots=roots, places=places, nearest=nearest))
    sys.stdout.write("[\n" + ",\n".join(json.dumps(o) for o in out) + "\n]\n")


main()
