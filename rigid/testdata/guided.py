"""Makes guided.json: bodies with one point known and another guided, worked out
with 50 digits from the closure equations. For every result the file also has the
sum of |x·∂y/∂x| over the inputs x, the measure of what rounding the inputs does.

    python3 guided.py > guided.json
"""
import json
import random
from mpmath import mp, mpf, matrix, lu_solve, hypot

mp.dps = 50
random.seed(3)


def solve(v):
    """Two linear equations for velocity, two for acceleration, as written down."""
    bx, by, ax, ay, vx, vy, cx, cy, lx, ly = v
    rx, ry, h = bx - ax, by - ay, hypot(lx, ly)
    ux, uy = lx / h, ly / h
    # v + w·r⊥ − s·u = 0
    m = matrix([[-ry, -ux], [rx, -uy]])
    w, s = lu_solve(m, matrix([-vx, -vy]))
    # a + α·r⊥ − w²r − s'·u = 0
    al, sa = lu_solve(m, matrix([-cx + w * w * rx, -cy + w * w * ry]))
    r = hypot(rx, ry)
    return [rx / r, ry / r, w, al, s, sa]


def row(v):
    v = [mpf(x) for x in v]
    y = solve(v)
    spread = [mpf(0)] * len(y)
    for i, x in enumerate(v):
        h = (abs(x) or mpf(1)) * mpf(10) ** -17
        up, down = solve(v[:i] + [x + h] + v[i + 1:]), solve(v[:i] + [x - h] + v[i + 1:])
        for k in range(len(y)):
            spread[k] += abs(x * (up[k] - down[k]) / (2 * h))
    return {"in": [float(x) for x in v],
            "out": [float(x) for x in y],
            "spread": [float(x) for x in spread]}


def num():
    return random.uniform(-1, 1)


rows = []
for size in (1e-6, 1e-3, 1, 1e3):
    for i in range(10):  # anywhere
        v = [num() * size for _ in range(4)] + [num() * size * 10 for _ in range(2)] + [num() * size * 100 for _ in range(2)]
        rows.append(row(v + [num(), num()]))
    for margin in (1e-2, 1e-4, 1e-6):  # next to the singular position
        for sign in (1, -1):
            rx, ry = num() * size, num() * size
            lx, ly = -ry + sign * margin * rx, rx + sign * margin * ry
            v = [rx, ry, 0, 0, num() * size, num() * size, num() * size, num() * size, lx, ly]
            rows.append(row(v))
    far = [num() * size + 100 * size, num() * size - 100 * size]  # far from the origin
    rows.append(row([far[0] + size, far[1]] + far + [size, 0, 0, size, 1, num()]))
print("[\n" + ",\n".join(json.dumps(r) for r in rows) + "\n]")
