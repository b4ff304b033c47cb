"""Prints cases.csv: angles, their sines and cosines to 25 digits."""
import random
from mpmath import mp, mpf, sin, cos, pi, nstr

mp.dps = 60
random.seed(4)
angles = [0.0, 1e-300, 1e-9, 1e6, 1e9]
angles += [float(k * pi / 4) for k in range(-8, 9)] + [float(k * pi / 128) for k in range(1, 60, 2)]
angles += [random.uniform(-10, 10) for _ in range(150)]
angles += [random.choice((-1, 1)) * 10 ** random.uniform(-12, 6) for _ in range(150)]
for a in angles:
    print(",".join([repr(a), nstr(sin(mpf(a)), 25), nstr(cos(mpf(a)), 25)]))
