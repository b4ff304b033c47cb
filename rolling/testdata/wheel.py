#!/usr/bin/env python3
"""Writes wheel.txt: motions of rolling wheels to 50 digits, for the tests.

The closure equations only: the centre goes round the track's centre, the wheel
turns, and the particle that touches the track at t = 0 is carried along. Rates are
central differences in time of those places, with 120 digits. Beside every output y
stands |y| + sum |x dy/dx| over all inputs x, from central differences too. Outputs
below 1e-40, noise of the differences, are 0 by the rolling condition and written so.

Each case is a line of inputs (mode, radius, ground, three of the first coordinate,
three of the second) and a line of outputs, each followed by its sum.
"""
import random
from mpmath import mp, mpf, cos, sin

mp.dps = 120
H = mpf(10) ** -30


def places(t, mode, r, R, a, b):
    """Turn, arc, travel and centre at time t, from the mode's coordinates."""
    p = a[0] + a[1] * t + a[2] * t * t / 2
    q = b[0] + b[1] * t + b[2] * t * t / 2
    over = R / (R + r) if R else mpf(1)  # arc over travel
    if mode == "turn":
        turn, travel = p, -r * p
    elif mode == "travel":
        turn, travel = -p / r, p
    elif mode == "arc":
        travel = p / over
        turn = -travel / r
    elif mode == "slip":
        turn, travel = p, q - r * p
    else:  # belt
        turn, travel = (q - p) / r, p
    if R:
        psi = travel / (R + r)
        centre = ((R + r) * sin(psi), (R + r) * cos(psi) - R)
        contact = (R * sin(psi), R * cos(psi) - R)
    else:
        centre, contact = (travel, r), (travel, mpf(0))
    return turn, travel * over, travel, centre, contact


def outputs(mode, r, R, a, b):
    def at(t):
        turn, arc, travel, c, _ = places(t, mode, r, R, a, b)
        d, e = cos(turn), sin(turn)
        particle = (c[0] + d * local[0] - e * local[1], c[1] + e * local[0] + d * local[1])
        return [c[0], c[1], particle[0], particle[1], turn, arc, travel]

    turn, _, _, c, k = places(mpf(0), mode, r, R, a, b)
    x, y = k[0] - c[0], k[1] - c[1]
    local = (cos(turn) * x + sin(turn) * y, -sin(turn) * x + cos(turn) * y)
    before, now, after = at(-H), at(mpf(0)), at(H)
    out = [cos(turn), sin(turn)]
    for p, q, s in zip(before, now, after):
        out += [q, (s - p) / (2 * H), (s - 2 * q + p) / (H * H)]
    return out


def sums(case):
    mode, numbers = case[0], case[1:]

    def f(x):
        return outputs(mode, x[0], x[1], x[2:5], x[5:8])

    y = f(numbers)
    total = [abs(v) for v in y]
    for j, x in enumerate(numbers):
        if x == 0:
            continue
        d = abs(x) * mpf(10) ** -20
        up, down = list(numbers), list(numbers)
        up[j] += d
        down[j] -= d
        for i, (p, q) in enumerate(zip(f(up), f(down))):
            total[i] += abs((p - q) / (2 * d) * x)
    return y, total


def cases():
    rng = random.Random(20)
    for i in range(150):
        r = 10 ** rng.uniform(-6, 3)
        kind = i % 6
        R = {0: 0.0, 1: r * 10 ** rng.uniform(-4, 4), 2: -r * (1 + 10 ** rng.uniform(-4, 4)),
             3: -r * rng.uniform(0.01, 0.99), 4: 0.0, 5: r * rng.uniform(0.5, 20)}[kind]
        mode = ("turn", "turn", "turn", "travel", "arc", "slip", "belt")[i % 7]
        pos = rng.choice((rng.uniform(-7, 7), 10 ** rng.uniform(-9, 0), rng.uniform(-7e6, 7e6), rng.uniform(-7e7, 7e7)))
        a = [pos, rng.uniform(-30, 30), rng.uniform(-90, 90)]
        b = [0.0, 0.0, 0.0]
        if mode in ("travel", "arc", "belt"):
            a = [r * x for x in a]
        if mode in ("slip", "belt"):
            b = [r * rng.uniform(-3, 3) for _ in range(3)]
        yield [mode, *map(mpf, [r, R, *a, *b])]


def main():
    with open("wheel.txt", "w") as f:
        for case in cases():
            y, total = sums(case)
            print(case[0], *(float(x).hex() for x in case[1:]), file=f)
            total = [t if abs(v) > 1e-40 else mpf(0) for v, t in zip(y, total)]
            y = [v if t else mpf(0) for v, t in zip(y, total)]
            print(*(float(v).hex() + " " + mp.nstr(t, 4) for v, t in zip(y, total)), file=f)


main()
