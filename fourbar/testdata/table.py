"""Prints table.csv: random four-bar linkages solved with 60 digits.

Each row has the drive, branch, side, the lengths, the angle of the mount, the
motion of the driven link, and for every output y its value and the sum of
|x dy/dx| over all these numbers x, from central differences of 1e-20. The place is
found from angles by the law of cosines, the rates from the differentiated closure
equations as linear systems: not by the formulas of the package.
"""
import random
from mpmath import mp, mpf, mpc, acos, cos, sin, exp, arg, pi, sqrt, matrix, lu_solve, nstr, fabs

mp.dps = 60
random.seed(20)
NAMES = ("u2x u2y u3x u3y u4x u4y w2 w3 w4 a2 a3 a4 px py vx vy ax ay turn swing mu").split()
STEP = mpf(10) ** -20


def triangle(p, q, d, side):
    """Angles of sides p and q of the triangle on the vector d: p − q = d, p left of d for side +1."""
    n = abs(d)
    at = acos((n * n + p * p - q * q) / (2 * n * p))
    there = acos((n * n + q * q - p * p) / (2 * n * q))
    return arg(d) + side * at, arg(d) + side * (pi - there)


def solve(drive, side, x):
    d, a, b, c, mount, pos, vel, acc = x
    e = lambda t: exp(mpc(0, 1) * t)
    if drive == "crank":
        t2 = pos
        t3, t4 = triangle(b, c, d - a * e(t2), side)
    elif drive == "follower":
        t4 = pos
        t2, t3 = triangle(a, b, d + c * e(t4), side)
        t3 += pi
    else:
        t3 = pos
        t2, t4 = triangle(a, c, d - b * e(t3), side)
    # a e2 + b e3 − c e4 = d, differentiated once and twice, for the two links that are not driven
    links = [(a, t2), (b, t3), (-c, t4)]
    k = ("crank", "coupler", "follower").index(drive)
    free = [i for i in range(3) if i != k]
    col = [mpc(0, 1) * l * e(t) for l, t in links]
    J = matrix([[col[i].real for i in free], [col[i].imag for i in free]])
    def rates(given, bias):
        r = -given * col[k] - bias
        s = lu_solve(J, matrix([r.real, r.imag]))
        out = [given] * 3
        out[free[0]], out[free[1]] = s[0], s[1]
        return out
    w = rates(vel, 0)
    al = rates(acc, sum(-w[i] ** 2 * links[i][0] * e(links[i][1]) for i in range(3)))
    m = e(mount)
    u = [m * e(t) for t in (t2, t3, t4)]
    p = a * u[0]
    v = mpc(0, 1) * w[0] * p
    q = (mpc(0, 1) * al[0] - w[0] ** 2) * p
    mu = arg(e(t4 - t3))
    return ([f for z in u for f in (z.real, z.imag)] + w + al +
            [p.real, p.imag, v.real, v.imag, q.real, q.imag, arg(e(t2)), arg(e(t4)), fabs(mu)])


def limits(base, arm, p, q):
    """Angles φ in [0, π] of |base − arm e^iφ| = |p − q| and p + q."""
    out = []
    for s in (abs(p - q), p + q):
        k = (base * base + arm * arm - s * s) / (2 * base * arm)
        if abs(k) < 1:
            out.append(acos(k))
    return out


def lengths():
    size = 10 ** random.uniform(-6, 3)
    short = lambda: 10 ** random.uniform(-4, 0)
    l = [random.uniform(0.3, 1) for _ in range(4)]
    kind = random.randrange(4)
    if kind == 1:
        l[random.randrange(4)] *= short()
    elif kind >= 2:
        i, j = random.sample(range(4), 2)
        s = short()
        l[i], l[j] = l[i] * s, l[j] * s
        p, q = [k for k in range(4) if k not in (i, j)]
        l[q] = l[p] + random.uniform(-1, 1) * (l[i] + l[j])
    return [float(v * size) for v in l]


def slender(drive):
    """Lengths of a short frame and driven link with two long links, which lie nearly along one another."""
    short = 10 ** random.uniform(-4, -2)
    base, arm, p = short * random.uniform(0.3, 1), short * random.uniform(0.3, 1), random.uniform(0.3, 1)
    q = p + random.uniform(-1, 1) * (base + arm)
    return {"crank": (base, arm, p, q), "follower": (base, p, q, arm), "coupler": (base, p, arm, q)}[drive]


def case(drive, lengths):
    while True:
        d, a, b, c = l = lengths()
        if min(l) <= 0 or max(l) > 1.02e4 * min(l) or 2 * max(l) > sum(l) * 0.999999:
            continue
        base, arm, p, q = {"crank": (d, a, b, c), "follower": (d, -c, a, b), "coupler": (d, b, a, c)}[drive]
        ends = limits(mpf(base), mpf(arm), mpf(p), mpf(q))
        pos = random.uniform(-3.14, 3.14)
        if ends and random.random() < 0.6:
            pos = float(random.choice(ends)) + random.choice((-1, 1)) * 10 ** random.uniform(-6, -1)
            pos *= random.choice((-1, 1))
        x = [mpf(v) for v in l] + [mpf(random.choice((0.0, random.uniform(-3, 3)))), mpf(pos),
             mpf(random.uniform(-30, 30)), mpf(random.choice((0.0, random.uniform(-300, 300))))]
        n = abs(x[0] - mpf(arm) * exp(mpc(0, 1) * x[5]))
        if not abs(mpf(p) - mpf(q)) < n < mpf(p) + mpf(q):
            continue
        if ends and min(abs(abs(x[5]) - e) for e in ends) < mpf(9) / 10 ** 7:
            continue
        return x


# Found among 20 000: an acceleration, or a velocity, depends on a length far less than
# the terms that make it.
HARD = [
    ("crank", -1, (0.0012014608841344914, 1.3738898376239472e-07, 0.0012013761563900505, 2.9093246584040917e-07, 0.0, 2.0347847694916417, 21.356686098244808, -172.70242715569586)),
    ("crank", -1, (1.762521059996713e-10, 7.766899920277247e-07, 7.767552905294807e-07, 2.8904310912836915e-10, 0.0, -0.5579246012080477, 14.175019245184203, 0.0)),
    ("crank", -1, (0.545009146012466, 0.0001571781467595989, 0.5449429946085852, 0.00026952595744527053, 1.89920769668025, 2.5578194207517044, -28.44706349069253, 0.0)),
    ("crank", -1, (8.840757576638965e-07, 0.00044137249381412435, 1.0698964004699644e-06, 0.0004412560459791944, 0.0, -0.6853449723234064, 19.646342721989683, 0.0)),
    ("crank", -1, (4.574667146268575e-05, 0.04260568452894476, 0.00012339645936943974, 0.0425669495204913, 0.0, 2.1614152577013788, 27.58232267932565, 0.0)),
    ("follower", 1, (5.873556775056361e-06, 0.013385554237677694, 8.515600160821557e-06, 0.013385793051165312, -0.3222377230298523, 0.5425808288582341, 18.631816264728442, 0.0)),
    ("coupler", 1, (4.351503198791935e-10, 1.3903684700924844e-09, 1.245715909875445e-06, 1.2462820353121672e-06, 1.590201115417754, 0.5620010601078844, -19.970765130566924, 186.28552832152872)),
]


def row(drive, side, x):
    y = solve(drive, side, x)
    total = [mpf(0)] * len(y)
    for i, v in enumerate(x):
        if v == 0:
            continue
        hi, lo = list(x), list(x)
        hi[i], lo[i] = v * (1 + STEP), v * (1 - STEP)
        for j, (p, q) in enumerate(zip(solve(drive, side, hi), solve(drive, side, lo))):
            delta = p - q
            if NAMES[j] in ("turn", "swing"):
                delta = arg(exp(mpc(0, 1) * delta))
            total[j] += abs(delta) / (2 * STEP)
    branch = "open" if y[2] * y[5] > y[3] * y[4] else "crossed"
    return [drive, branch, "left" if side > 0 else "right"] + [repr(float(v)) for v in x] + \
        [f for v, t in zip(y, total) for f in (nstr(v, 22), nstr(t, 6))]


print(",".join("drive branch side frame crank coupler follower mount pos vel acc".split() + [f for n in NAMES for f in (n, "sum " + n)]))
for drive, n in (("crank", 200), ("follower", 100), ("coupler", 100)):
    for _ in range(n):
        x = case(drive, lengths)
        print(",".join(row(drive, random.choice((1, -1)), x)))
for drive, n in (("crank", 120), ("follower", 40), ("coupler", 40)):
    for _ in range(n):
        x = case(drive, lambda: slender(drive))
        print(",".join(row(drive, random.choice((1, -1)), x)))
for drive, side, x in HARD:
    print(",".join(row(drive, side, [mpf(v) for v in x])))
