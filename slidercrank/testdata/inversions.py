#!/usr/bin/env python3
"""Writes the tables inversions_*.csv against which the inversions are tested.

Every place comes from the closure of the loop in complex numbers, with 110 digits;
rates are differences of the place along the path of the drive, at steps that leave
50 digits. Beside each value y stands K = |y| + sum |x dy/dx| over all inputs x,
the lengths, angles and the drive's place, rate and acceleration: the unit in which
an error of float64 arithmetic is measured.

    python3 inversions.py        # rewrites the tables beside this file
"""
import csv
import pathlib
import random
import sys

from mpmath import acos, asin, atan2, cos, exp, floor, mp, mpc, mpf, pi, sin, sqrt

mp.dps = 110
HERE = pathlib.Path(__file__).parent
H = mpf(10) ** -22


def arg(z):
    return atan2(z.imag, z.real)


def wrap(a):
    """a less whole turns, in (-pi, pi]."""
    return a - 2 * pi * (floor((a - pi) / (2 * pi)) + 1)


# ---- places: each takes the dimensions and the drive's place, and returns the outputs

def slot_chain(r, c, e, turn):
    d = c + r * exp(mpc(0, turn))
    slide = sqrt(abs(d) ** 2 - e ** 2)
    lean = arg(d) if r <= c else turn + arg(d * exp(mpc(0, -turn)))
    return lean - atan2(e, slide), slide


def slot_chain_back(r, c, e, swing, knee):
    h = e + c * sin(swing)
    xi = knee * sqrt(r * r - h * h)
    pin = mpc(xi, h) * exp(mpc(0, swing))
    return arg(pin), c * cos(swing) + xi


def length_drive(r, c, e, slide, knee):
    turn = knee * acos((slide ** 2 + e ** 2 - r * r - c * c) / (2 * r * c))
    return turn, slot_chain(r, c, e, turn)[0]


def yoke(r, tilt, turn):
    # pin = slide + block*i*exp(i tilt)
    pin = r * exp(mpc(0, turn))
    block = pin.imag / cos(tilt)
    return pin.real + block * sin(tilt), block


def yoke_back(r, tilt, slide, knee):
    turn = tilt + knee * acos(slide * cos(tilt) / r)
    return wrap(turn), yoke(r, tilt, turn)[1]


def rod(l, angle, turn):
    # a + l exp(i turn) = b exp(i angle)
    b = l * sin(turn) / sin(angle)
    return b * cos(angle) - l * cos(turn), b


def rod_back_a(l, angle, a, knee):
    b = a * cos(angle) + knee * sqrt(l * l - (a * sin(angle)) ** 2)
    return arg(b * exp(mpc(0, angle)) - a), b


def rod_back_b(l, angle, b, knee):
    a = b * cos(angle) + knee * sqrt(l * l - (b * sin(angle)) ** 2)
    return arg(b * exp(mpc(0, angle)) - a), a


def ram(r, c, e, arm, lean, l, gx, gy, ga, turn, branch):
    swing, _ = slot_chain(r, c, e, turn)
    pin = (-c + arm * exp(mpc(0, swing + lean)) - mpc(gx, gy)) * exp(mpc(0, -ga))
    if l == 0:
        return swing, pin.real
    return swing, pin.real + branch * sqrt(l * l - pin.imag ** 2)


# ---- tables

def motion(place, dims, drive, fixed):
    """Places, rates and accelerations of all outputs for a drive (pos, vel, acc)."""
    pos, vel, acc = drive

    def at(t):
        return place(*dims, pos + vel * t + acc * t * t / 2, *fixed)

    low, mid, high = at(-H), at(mpf(0)), at(H)
    out = []
    for a, y, b in zip(low, mid, high):
        out += [y, (b - a) / (2 * H), (a - 2 * y + b) / H ** 2]
    return out


def conditioned(place, dims, drive, fixed):
    """Each output with its K."""
    x = [mpf(v) for v in dims] + [mpf(v) for v in drive]
    n = len(dims)

    def run(v):
        return motion(place, v[:n], v[n:], fixed)

    y = run(x)
    k = [abs(v) for v in y]
    for j, v in enumerate(x):
        if v == 0:
            continue
        step = v * mpf(10) ** -20
        up, down = x[:], x[:]
        up[j], down[j] = v + step, v - step
        for i, (a, b) in enumerate(zip(run(down), run(up))):
            k[i] += abs((b - a) / (2 * mpf(10) ** -20))
    return list(zip(y, k))


def write(name, place, dims, drive, outputs, rows):
    head = dims + [drive, drive + "_vel", drive + "_acc", "pick"]
    for o in outputs:
        for d in ("", "_vel", "_acc"):
            head += [o + d, "K_" + o + d]
    with open(HERE / f"inversions_{name}.csv", "w", newline="") as f:
        w = csv.writer(f, lineterminator="\n")
        w.writerow(head)
        for d, v, pick in rows:
            pairs = conditioned(place, d, v, [pick] if pick else [])
            line = [repr(float(x)) for x in list(d) + list(v)] + [pick or 0]
            for y, k in pairs:
                line += [mp.nstr(y, 20), mp.nstr(k, 6)]
            w.writerow(line)


rng = random.Random(20240501)


def size():
    return 10 ** rng.uniform(-6, 3)


def small():
    return rng.choice([-1, 1]) * 10 ** rng.uniform(-6, 0)


def rates():
    v = [rng.choice([-1, 1]) * 10 ** rng.uniform(-1, 2), rng.choice([-1, 1]) * 10 ** rng.uniform(-1, 3)]
    if rng.random() < 0.15:
        v[rng.randrange(2)] = 0.0
    return v


def chain_dims():
    """r, c, e with the crank shorter or longer, and with a crank that can only rock."""
    while True:
        long, ratio = size(), 10 ** rng.uniform(-4, 0)
        if rng.random() < 0.2:
            ratio = 1 - 10 ** rng.uniform(-6, -1)
        r, c = rng.choice([(long, long * ratio), (long * ratio, long)])
        gap, e = abs(r - c), 0.0
        kind = rng.randrange(3)
        if kind == 1:
            e = rng.choice([-1, 1]) * gap * rng.choice([rng.random(), 10 ** rng.uniform(-4, 0)])
        if kind == 2:
            e = rng.choice([-1, 1]) * (gap + (r + c - gap) * rng.uniform(0.01, 0.99))
        if abs(gap - abs(e)) > 1e-7 * long:
            return r, c, e


def chain_turn(r, c, e):
    """A crank angle: anywhere, or near the nearest, the farthest or a dead position."""
    end = float(pi)
    if abs(e) > abs(r - c):
        end = float(acos((mpf(e) ** 2 - mpf(r) ** 2 - mpf(c) ** 2) / (2 * mpf(r) * mpf(c))))
    picks = [rng.uniform(-end, end), end - abs(small()), -end + abs(small()), small()]
    for side in (-1, 1):
        x = (side * mpf(r) - mpf(e)) / mpf(c)
        if abs(x) < 1:
            picks.append(float(wrap(asin(x) + side * pi / 2)) + small())
    turn = rng.choice(picks)
    if end == float(pi) and rng.random() < 0.2:
        turn += 2 * float(pi) * rng.randint(-1000, 1000)
    return turn if abs(turn) < end or end == float(pi) else rng.uniform(-0.9, 0.9) * end


def forward(n):
    for _ in range(n):
        d = chain_dims()
        yield d, [chain_turn(*d), *rates()], 0


def by_swing(n):
    while n:
        r, c, e = chain_dims()
        turn = chain_turn(r, c, e)
        swing = float(slot_chain(mpf(r), mpf(c), mpf(e), mpf(turn))[0])
        foot = mpf(c) * cos(mpf(swing))
        knee = 1 if slot_chain(mpf(r), mpf(c), mpf(e), mpf(turn))[1] > foot else -1
        h = mpf(e) + mpf(c) * sin(mpf(swing))
        if abs(h) >= r * (1 - mpf(10) ** -13):
            continue
        n -= 1
        yield (r, c, e), [swing, *rates()], knee


def by_length(n):
    while n:
        r, c, e = chain_dims()
        turn = chain_turn(r, c, e)
        slide = float(slot_chain(mpf(r), mpf(c), mpf(e), mpf(turn))[1])
        d2 = mpf(slide) ** 2 + mpf(e) ** 2
        if not ((mpf(r) - c) ** 2 < d2 < (mpf(r) + c) ** 2):
            continue
        if c * abs(sin(mpf(turn))) < 2e-8 * sqrt(d2):
            continue  # rates are refused there
        v = rates()
        n -= 1
        yield (r, c, e), [slide, v[0] * r, v[1] * r], 1 if wrap(mpf(turn)) > 0 else -1


def tilts(n):
    for _ in range(n):
        yield rng.choice([0.0, rng.uniform(-1.5, 1.5), small(), float(pi) / 2 - abs(small()), -float(pi) / 2 - 10 ** rng.uniform(-8, -1)])


def yokes(n):
    for tilt in tilts(n):
        turn = rng.choice([rng.uniform(-7, 7), tilt + small(), tilt + float(pi) / 2 + small(), 6283.1853 + rng.random()])
        yield (size(), tilt), [turn, *rates()], 0


def yokes_back(n):
    for (r, tilt), (turn, *v), _ in yokes(n):
        knee = 1 if sin(mpf(turn) - mpf(tilt)) > 0 else -1
        slide = float(yoke(mpf(r), mpf(tilt), mpf(turn))[0])
        if abs(mpf(slide) * cos(mpf(tilt))) < mpf(r):
            yield (r, tilt), [slide, v[0] * r, v[1] * r], knee


def angles(n):
    for _ in range(n):
        yield rng.choice([float(pi) / 2, rng.uniform(0.05, 3.1), -rng.uniform(0.05, 3.1), rng.uniform(-9, -7), small(), float(pi) - 10 ** rng.uniform(-8, -1)])


def rods(n):
    for angle in angles(n):
        turn = rng.choice([rng.uniform(-7, 7), small(), angle + small(), angle + float(pi) / 2 + small(), 628.31853 + rng.random()])
        yield (size(), angle), [turn, *rates()], 0


def rods_back(n, end):
    for (l, angle), (turn, *v), _ in rods(n):
        place = [float(x) for x in rod(mpf(l), mpf(angle), mpf(turn))][end]
        lean = cos(mpf(turn) - mpf(angle)) if end == 0 else -cos(mpf(turn))
        if abs(mpf(place) * sin(mpf(angle))) < mpf(l):
            yield (l, angle), [place, v[0] * l, v[1] * l], 1 if lean > 0 else -1


def rams(n):
    # a lever that turns over quickly with its arm along the travel: the ram shows what rounding leaves of its rate
    yield (
        (0.687347704080498, 0.6809082395686941, -0.0064392112616967374, 4.591641097259644, float(pi), 12.122486764433457,
         -0.6809082395686941, 0.35215198038475864, float(pi) / 2),
        [-3.1190468831246485, -3.3364586085901933, 25.259956781020698], 1)
    while n:
        r, c, e = chain_dims()
        turn = chain_turn(r, c, e)
        long = max(r, c)
        arm, lean = long * 10 ** rng.uniform(-1, 1), rng.choice([0.0, float(pi), rng.uniform(-3, 3)])
        l = rng.choice([0.0, arm * rng.uniform(0.3, 5)])
        g = [long * rng.uniform(-1, 1), long * rng.uniform(-1, 1), rng.uniform(-4, 4)]
        branch = rng.choice([-1, 1])
        d = (r, c, e, arm, lean, l, *g)
        if l:
            swing, _ = slot_chain(mpf(r), mpf(c), mpf(e), mpf(turn))
            eta = ((-mpf(c) + arm * exp(mpc(0, swing + lean)) - mpc(g[0], g[1])) * exp(mpc(0, -mpf(g[2])))).imag
            if abs(eta) >= l * (1 - mpf(10) ** -12):
                continue
        n -= 1
        yield d, [turn, *rates()], branch


if __name__ == "__main__":
    chain = ["crank", "centre", "offset"]
    tables = {
        "turn": (lambda r, c, e, t: slot_chain(r, c, e, t), chain, "turn", ["swing", "slide"], lambda: forward(400)),
        "swing": (slot_chain_back, chain, "swing", ["turn", "slide"], lambda: by_swing(300)),
        "length": (length_drive, chain, "slide", ["turn", "swing"], lambda: by_length(300)),
        "yoke": (yoke, ["crank", "tilt"], "turn", ["slide", "block"], lambda: yokes(150)),
        "yokeback": (yoke_back, ["crank", "tilt"], "slide", ["turn", "block"], lambda: yokes_back(150)),
        "rod": (rod, ["length", "angle"], "turn", ["a", "b"], lambda: rods(150)),
        "roda": (rod_back_a, ["length", "angle"], "a", ["turn", "b"], lambda: rods_back(150, 0)),
        "rodb": (rod_back_b, ["length", "angle"], "b", ["turn", "a"], lambda: rods_back(150, 1)),
        "ram": (ram, chain + ["arm", "armangle", "rod", "guidex", "guidey", "guideangle"], "turn", ["swing", "travel"], lambda: rams(200)),
    }
    for name in sys.argv[1:] or tables:
        place, dims, drive, outputs, rows = tables[name]
        rng.seed("twopoint " + name)
        write(name, place, dims, drive, outputs, rows())
