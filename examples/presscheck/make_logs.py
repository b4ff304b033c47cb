#!/usr/bin/env python3
"""Makes logs/*.csv: recordings of an invented roof-tile press for the example, one of a good machine and one for each
fault. The press starts parked, runs up to 24 rpm and runs six turns. The encoder sits on the motor, behind a belt of 5 : 1,
and gives 4096 counts a turn of the motor; its zero is not where presscheck.json has it, nor is that of the ram scale, which
reads to 0.01 mm with noise of 0.02 mm. The samples come every 8 ms, give or take 2 ms. In each log one line is spoilt and one
sample of the scale is off, as they are in real recordings."""
import math
import random

GEAR, PER_TURN, ZERO = 5, 4096, 5000 + 1234         # presscheck.json has 5000 for the zero
SCALE = -0.0021                                     # m, what the scale reads at the crank pivot
PARK, RUN_UP, RUN, STEP = 0.20, 0.80, 15.2, 0.008   # s
SPEED = 24 * 2 * math.pi / 60                       # rad/s
START = 0.4                                         # rad

def turned(t):                                      # crank angle since the start, smooth run-up, if nothing slips
    t = max(0.0, t - PARK)
    if t < RUN_UP:
        s = t / RUN_UP
        return SPEED * RUN_UP * (s**3 - s**4 / 2)   # speed 3s² − 2s³
    return SPEED * (RUN_UP / 2 + t - RUN_UP)

def nothing(t):
    return 0

def creep(t):                                       # the belt: 0.4 mrad a turn, all the time
    return 0.4e-3 * turned(t) / (2 * math.pi)

def burst(t):                                       # the clutch: 15 mrad in 0.15 s
    return 15e-3 * min(max((t - 8.0) / 0.15, 0), 1)

def leap(t):                                        # counts: 37 lost, 22 found again, later
    return -37 * (t > 5.13) + 22 * (t > 11.92)

def fade(t):                                        # counts: one lost at a time, 1.5 a turn
    return -math.floor(1.5 * turned(t) / (2 * math.pi))

def log(name, crank=0.120, rod=0.480, offset=0.015, slip=nothing, lost=nothing):
    random.seed(name)
    with open(f"logs/{name}.csv", "w") as f:
        f.write("time_s,motor_counts,ram_m\n")
        t, k = 0.0, 0
        while t < PARK + RUN_UP + RUN:
            motor = START + turned(t)
            turn = motor - slip(t)
            ram = crank * math.cos(turn) + math.sqrt(rod**2 - (offset - crank * math.sin(turn))**2) + SCALE
            counts = ZERO + math.floor(motor * GEAR / (2 * math.pi) * PER_TURN) + lost(t)
            ram += random.gauss(0, 2e-5) + (0.004 if k == 900 else 0)
            row = f"{t:.4f},{counts},{round(ram, 5):.5f}"
            f.write((row.replace(",0.", ",O.") if k == 555 else row) + "\n")
            t, k = round(t + STEP + random.uniform(-2e-3, 2e-3), 4), k + 1

log("good")
log("slip-belt", slip=creep)
log("slip-clutch", slip=burst)
log("missed-counts", lost=leap)
log("fading-counts", lost=fade)
log("crank", crank=0.1204)
log("rod", rod=0.4788)
log("offset", offset=0.0165)
