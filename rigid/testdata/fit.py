"""Makes fit.json: rigid motions fitted to tracked points with 60 digits. The turn
is found as the root of the derivative of the squared distances, the rates by the
normal equations of all four unknowns, neither by the closed form. For every result
the file has the sum of |x·∂y/∂x| over the inputs x.

    python3 fit.py > fit.json
"""
import json
import random
from mpmath import mp, mpf, matrix, lu_solve, cos, sin, sqrt, findroot

mp.dps = 60
random.seed(4)


def solve(v, n, start):
    p = [v[8 * i:8 * i + 8] for i in range(n)]  # lx ly x y vx vy ax ay
    c = [sum(q[k] for q in p) / n for k in range(8)]
    d = [[q[k] - c[k] for k in range(8)] for q in p]

    def slope(t):
        return sum((q[0] * sin(t) + q[1] * cos(t)) * q[2] + (q[1] * sin(t) - q[0] * cos(t)) * q[3] for q in d)

    t = findroot(slope, start, tol=1e-100)
    ux, uy = cos(t), sin(t)
    r = [(ux * q[0] - uy * q[1], uy * q[0] + ux * q[1]) for q in p]
    ox, oy = c[2] - sum(x for x, _ in r) / n, c[3] - sum(y for _, y in r) / n
    pos = sum((q[2] - ox - x) ** 2 + (q[3] - oy - y) ** 2 for q, (x, y) in zip(p, r))

    def normal(rhs):
        """Least squares of V + w·r⊥ = rhs for (Vx, Vy, w)."""
        m, b = matrix(3, 3), matrix(3, 1)
        for (x, y), (bx, by) in zip(r, rhs):
            for a, z in (((1, 0, -y), bx), ((0, 1, x), by)):
                for i in range(3):
                    b[i] += a[i] * z
                    for k in range(3):
                        m[i, k] += a[i] * a[k]
        s = lu_solve(m, b)
        rest = sum((s[0] - s[2] * y - bx) ** 2 + (s[1] + s[2] * x - by) ** 2 for (x, y), (bx, by) in zip(r, rhs))
        return s, rest

    vel, mv = normal([(q[4], q[5]) for q in p])
    w = vel[2]
    acc, ma = normal([(q[6] + w * w * x, q[7] + w * w * y) for q, (x, y) in zip(p, r)])
    return [ox, oy, ux, uy, vel[0], vel[1], acc[0], acc[1], w, acc[2],
            sqrt(pos / n), sqrt(mv / n), sqrt(ma / n)]


def row(n, size, far, noise):
    t, w, al = random.uniform(-3, 3), random.uniform(-5, 5), random.uniform(-20, 20)
    shake = lambda k: random.gauss(0, 1) * noise * size * k
    v = []
    for _ in range(n):
        lx, ly = random.uniform(-1, 1) * size, random.uniform(-1, 1) * size
        x, y = cos(t) * lx - sin(t) * ly, sin(t) * lx + cos(t) * ly
        v += [lx, ly, far + x + shake(1), -far + y + shake(1), far - w * y + shake(5), w * x + shake(5),
              -al * y - w * w * x + shake(25), al * x - w * w * y + shake(25)]
    v = [mpf(float(x)) for x in v]
    y = solve(v, n, t)
    spread = [mpf(0)] * len(y)
    for i, x in enumerate(v):
        h = abs(x) * mpf(10) ** -20
        up, down = solve(v[:i] + [x + h] + v[i + 1:], n, t), solve(v[:i] + [x - h] + v[i + 1:], n, t)
        for k in range(len(y)):
            spread[k] += abs(x * (up[k] - down[k]) / (2 * h))
    return {"in": [float(x) for x in v], "out": [float(x) for x in y], "spread": [float(x) for x in spread]}


rows = [row(n, size, far * size, noise)
        for n, size in ((2, 1), (3, 1e-6), (4, 0.1), (6, 1e3))
        for far in (0, 1e5)
        for noise in (1e-4, 1e-1)]
print("[\n" + ",\n".join(json.dumps(r) for r in rows) + "\n]")
