#!/usr/bin/env python3
"""Makes log.csv: a recording of an invented roof-tile press, for the example. The press starts parked at its outer dead
centre, runs up to 24 rpm, runs two and a half turns and stops. The crank encoder gives 16 384 counts a turn, the ram scale
reads to 0.01 mm with noise of 0.02 mm; the rod of this machine is 0.3 mm shorter than in machine.json. Two lines are
spoilt, as they are in real recordings."""
import math
import random

CRANK, ROD, OFFSET = 0.120, 0.4797, 0.015          # m; machine.json has 0.480 for the rod
PER_TURN, ZERO = 16384, 5000
PARK, RUN_UP, RUN, STEP = 0.20, 0.80, 5.60, 0.005   # s
SPEED = 24 * 2 * math.pi / 60                       # rad/s

def turned(t):                                      # crank angle since the start, smooth run-up
    t = max(0.0, t - PARK)
    if t < RUN_UP:
        s = t / RUN_UP
        return SPEED * RUN_UP * (s**3 - s**4 / 2)   # speed 3s² − 2s³
    return SPEED * (RUN_UP / 2 + t - RUN_UP)

random.seed(24)
start = math.asin(OFFSET / (CRANK + ROD))           # the outer dead centre
with open("log.csv", "w") as f:
    f.write("time_s,crank_counts,ram_m\n")
    for k in range(int((PARK + RUN_UP + RUN) / STEP) + 1):
        t = k * STEP
        turn = start + turned(t)
        ram = CRANK * math.cos(turn) + math.sqrt(ROD**2 - (OFFSET - CRANK * math.sin(turn))**2)
        counts = ZERO + math.floor(turn / (2 * math.pi) * PER_TURN)
        row = f"{t:.3f},{counts},{round(ram + random.gauss(0, 2e-5), 5):.5f}"
        if k == 400:
            row = f"{t:.3f},{counts}"               # the last field is lost
        if k == 777:
            row = row.replace(",0.", ",O.")         # a letter for a digit
        f.write(row + "\n")
