#!/usr/bin/env python3
"""Writes the tables slidercrank_*.csv against which the slider-crank is tested, in the
form and with the means of inversions.py.

    python3 slidercrank.py        # rewrites the tables beside this file
"""
import csv
import sys

from mpmath import acos, asin, cos, mp, mpc, mpf, pi, sin, sqrt

sys.dont_write_bytecode = True
from inversions import HERE, arg, conditioned, rates, rng, size, small, wrap


# ---- places: each takes the dimensions and the drive's place, and returns the outputs

def by_crank(r, l, e, turn, side):
    lean = asin((e - r * sin(turn)) / l)
    return (lean if side > 0 else pi - lean), r * cos(turn) + side * l * cos(lean)


def by_slide(r, l, e, slide, pick):
    """pick: -1 with the crank pin left of the line to the slider pin, 1 right."""
    d = mpc(slide, e)
    at_pivot = acos((abs(d) ** 2 + r * r - l * l) / (2 * abs(d) * r))
    at_slider = acos((abs(d) ** 2 + l * l - r * r) / (2 * abs(d) * l))
    return wrap(arg(d) - pick * at_pivot), wrap(arg(d) + pick * at_slider)


def by_length(r, l, e, turn, side):
    """The derivatives of the slide's place by each length, as differences of places."""
    x, out = [r, l, e], []
    for j in range(3):
        step = (r + l) * mpf(10) ** -40
        up, down = x[:], x[:]
        up[j], down[j] = x[j] + step, x[j] - step
        out.append((by_crank(*up, turn, side)[1] - by_crank(*down, turn, side)[1]) / (2 * step))
    return out


# ---- rows

def dims():
    """Cranks that turn fully, nearly so, or rock, with offsets up to the limit."""
    while True:
        l = size()
        r = l * rng.choice([rng.uniform(0.01, 0.99), 10 ** rng.uniform(-2, 0), 10 ** rng.uniform(0, 2), 1 - 10 ** rng.uniform(-4, -1)])
        gap, sign = abs(l - r), rng.choice([-1, 1])
        e = rng.choice([0.0, sign * gap * rng.random(), sign * gap * (1 - 10 ** rng.uniform(-4, -1)), sign * gap * 10 ** rng.uniform(-4, 0),
                        sign * rng.uniform(gap, l + r), sign * (l + r) * (1 - 10 ** rng.uniform(-4, -1))])
        if abs(gap - abs(e)) > 1e-7 * l and abs(e) < (l + r) * (1 - 1e-7):
            return r, l, e


def ends(r, l, e):
    """Crank angles where the rod stands square to the guide."""
    for y in ((mpf(e) - l) / r, (mpf(e) + l) / r):
        if abs(y) < 1:
            yield float(asin(y))
            yield float(pi - asin(y))


def dead(r, l, e, side):
    """Crank angles at the dead centres."""
    for length in (mpf(l) + r, mpf(l) - r):
        if abs(length) > abs(e):
            lean = asin(e / length)
            lean = lean if side > 0 else pi - lean
            yield float(lean if length == mpf(l) + r else lean + pi)


def turn(r, l, e, side):
    """A crank angle: anywhere, or near a limit, a dead centre or a quarter turn."""
    while True:
        near = [*ends(r, l, e), *dead(r, l, e, side), float(pi) / 2, -float(pi) / 2]
        t = rng.choice([rng.uniform(-3.2, 3.2), rng.choice(near) + small(), rng.choice(near) + small(), rng.uniform(-6000, 6000)])
        if abs(mpf(e) - r * sin(mpf(t))) < l * (1 - mpf(10) ** -13):
            return t


def cranks(n):
    for _ in range(n):
        d, side = dims(), rng.choice([-1, 1])
        yield d, [turn(*d, side), *rates()], side


def slides(n):
    while n:
        (r, l, e), side = dims(), rng.choice([-1, 1])
        t = turn(r, l, e, side)
        slide = float(by_crank(mpf(r), mpf(l), mpf(e), mpf(t), side)[1])
        d2 = mpf(slide) ** 2 + mpf(e) ** 2
        area16 = ((mpf(l) + r) ** 2 - d2) * (d2 - (mpf(l) - r) ** 2)
        if area16 < (4e-8 * mpf(l) * r) ** 2:
            continue  # rates are refused there
        n -= 1
        v = rates()
        yield (r, l, e), [slide, v[0] * r, v[1] * r], rng.choice([-1, 1])


def write(name, place, drive, outputs, rows):
    head = ["crank", "rod", "offset", drive, drive + "_vel", drive + "_acc", "pick"]
    head += [k + o + d for o in outputs for d in ("", "_vel", "_acc") for k in ("", "K_")]
    with open(HERE / f"slidercrank_{name}.csv", "w", newline="") as f:
        w = csv.writer(f, lineterminator="\n")
        w.writerow(head)
        for d, v, pick in rows:
            line = [repr(float(x)) for x in list(d) + list(v)] + [pick]
            for y, k in conditioned(place, d, v, [pick]):
                line += [mp.nstr(y, 20), mp.nstr(k, 6)]
            w.writerow(line)


if __name__ == "__main__":
    rng.seed("twopoint slidercrank")
    write("crank", by_crank, "turn", ["rod", "slide"], cranks(400))
    write("slide", by_slide, "slide", ["turn", "rod"], slides(400))
    mp.dps = 200  # the steps of by_length take some
    write("length", by_length, "turn", ["by_crank", "by_rod", "by_offset"], cranks(200))
