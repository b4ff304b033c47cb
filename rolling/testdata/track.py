#!/usr/bin/env python3
"""Writes track.txt: points of a track of bends to 50 digits, by adaptive quadrature.

A line is: arc, x, y, direction. The bends are those of TestTrackTable: length,
curvature at the start, curvature at the end.
"""
from mpmath import mp, mpf, quad, cos, sin, linspace

mp.dps = 50
BENDS = [("2.5", "0", "0"), ("4", "0", "0.5"), ("3", "0.5", "0.5"), ("2", "0.5", "-1.25"), ("30", "-0.1", "-0.7")]
BENDS = [[mpf(float(x)) for x in b] for b in BENDS]


def point(arc):
    x = y = phi = mpf(0)
    for length, k0, k1 in BENDS:
        s = min(arc, length)
        rate = (k1 - k0) / length

        def direction(u, phi=phi, k0=k0, rate=rate):
            return phi + k0 * u + rate * u * u / 2

        parts = linspace(0, s, 12)
        x += quad(lambda u: cos(direction(u)), parts)
        y += quad(lambda u: sin(direction(u)), parts)
        phi = direction(s)
        arc -= s
        if arc <= 0:
            break
    return x, y, phi


with open("track.txt", "w") as f:
    for i in range(0, 84, 3):
        arc = float(i) / 2
        print(arc.hex(), *(float(v).hex() for v in point(mpf(arc))), file=f)
