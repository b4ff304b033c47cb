#!/usr/bin/python3
"""cases.py gen        -> cases.json, the one shared geometry file
   cases.py flat DIR   -> the same numbers as plain text files, for the C peers (no JSON parser needed there)"""
import json, math, sys
from cmath import rect, phase

COMMON = {
    "sweep": "k = 0..steps-1: phi = 2*pi*k/steps, omega = 10 + k%7, alpha = -3 + k%11 (crank angle, rate, acceleration)",
    "out8": "x,y,vx,vy,ax,ay of the output point, then w,alpha of the output body",
    "branch": "dyad A-B-C with |AB|=b, |CB|=c: sign of cross(C-A, B-A)",
    "body": "body k: q = x,y,theta of its own frame; 0 is ground; pin = [ia, ax,ay, ib, bx,by], local points that coincide; "
            "rows: pin 0, driver (theta_1 = phi), then the other pins; out = [body, x, y]; q0 = rough guess for phi = 0",
}
SLIDER = dict(steps=4096, check=[0, 1000, 2500, 4095], r=0.11, l=0.37, e=0.043,
              note="crank pin A = r*(cos,sin)(phi); slider pin B = (x, e), x > A.x, |AB| = l; out: B and the rod's w,alpha")
LEVER = dict(steps=4096, check=[0, 1000, 2500, 4095], r=0.11, c=0.26, e=0.02,
             note="crank pivot (0,0), lever pivot (-c,0), crank pin at (s, e) in the lever, s > 0; out: the pin's motion as seen "
                  "from the lever (s, e, s', 0, s'', 0) and the lever's w,alpha; lever.c has the numbers itself")
FOUR = dict(steps=4096, check=[0, 1000, 2500, 4095], a=1.1, b=3.5, c=2.7, O4=[4.0, 0.3], branch=1, P=[1.9, 1.2],
            note="O2 = (0,0), A = a*(cos,sin)(phi), |AB| = b, |O4 B| = c; P in the coupler frame (origin A, x towards B); "
                 "out: P and the follower's w,alpha")
SIX = dict(steps=3600, check=[0, 900, 2345, 3599], a=1.1, b=3.5, c=2.7, O4=[4.0, 0.3], branch=1)
WATT = dict(SIX, base="follower", Q=[1.4, -1.5], O6=[8.2, -0.9], b2=3.3, c2=2.6, branch2=1,
            note="Q in the follower frame (origin O4, x towards B); |QD| = b2, |O6 D| = c2; out: D and the output rocker")
STEPH = dict(SIX, base="coupler", Q=[1.9, 1.2], O6=[5.6, 3.0], b2=4.2, c2=2.6, branch2=1,
             note="Q in the coupler frame (origin A, x towards B); |QD| = b2, |O6 D| = c2; out: D and the output rocker")

def dyad(A, C, b, c, s):
    D = C - A; d2 = abs(D) ** 2; u = (d2 + b*b - c*c) / (2*d2)
    return A + D * (u + 1j * s * math.sqrt(b*b/d2 - u*u))

def body(C, off):                       # frame at the middle of two pins, x from the first to the second
    return [round(v, 2) for v in ((C[0]+C[1]).real/2, (C[0]+C[1]).imag/2, phase(C[1]-C[0]) + off)]

def sixbar(m):
    O4, O6, A = complex(*m["O4"]), complex(*m["O6"]), complex(m["a"])
    B = dyad(A, O4, m["b"], m["c"], m["branch"])
    base, tip, L, bi = (O4, B, m["c"], 3) if m["base"] == "follower" else (A, B, m["b"], 2)
    Q = base + complex(*m["Q"]) * (tip - base) / abs(tip - base)
    D = dyad(Q, O6, m["b2"], m["c2"], m["branch2"])
    a, b, c, b2, c2 = (m[k]/2 for k in ("a", "b", "c", "b2", "c2"))
    m["pins"] = [[0, 0., 0., 1, -a, 0.], [1, a, 0., 2, -b, 0.], [2, b, 0., 3, c, 0.], [0, *m["O4"], 3, -c, 0.],
                 [bi, m["Q"][0]-L/2, m["Q"][1], 4, -b2, 0.], [4, b2, 0., 5, c2, 0.], [0, *m["O6"], 5, -c2, 0.]]
    m["out"] = [5, c2, 0.]
    m["q0"] = sum((body(p, 0) for p in ((0, A), (A, B), (O4, B), (Q, D), (O6, D))), [])
    m["th0"] = [round(phase(v), 2) for v in (B-A, B-O4, D-Q, D-O6)]
    return m

def chain(n):
    """Drag links (ground is shortest), every second one the mirrored inverse of its forerunner: the follower of one is the
    crank of the next, the angle ratio does not drift, lengths are perturbed by up to 0.5 %."""
    base, d, seed, loops, pins, q0 = (1.5, 1.3, 1.6), 0.5, 12345, [], [], []
    O, crank, off = 0j, 1+0j, 0.0       # pivot, unit vector of the crank arm, its angle in the crank body
    for i in range(n):
        L = []
        for v in base if i % 2 == 0 else base[::-1]:
            seed = (seed * 1103515245 + 12345) % 2**31
            L.append(round(v * (1 + 0.005 * (2 * seed / 2**31 - 1)), 6))
        a, b, c = L
        s = -1 if i % 2 == 0 else 1
        off = 0.0 if i == 0 else round(math.pi + (0.4 if i % 2 == 0 else 0.0), 6)
        arm = rect(a, off)              # crank pin in the frame at the pivot, x towards the previous B
        P, A = O + d, O + crank * arm
        B = dyad(A, P, b, c, s)
        loops.append(dict(O=[P.real, P.imag], off=off, a=a, b=b, c=c, branch=s))
        if i == 0:
            pins.append([0, 0., 0., 1, -a/2, 0.]); q0 += body((O, A), 0); h = a/2
        pins += [[2*i+1, arm.real - h, arm.imag, 2*i+2, -b/2, 0.], [2*i+2, b/2, 0., 2*i+3, c/2, 0.],
                 [0, P.real, P.imag, 2*i+3, -c/2, 0.]]
        q0 += body((A, B), 0) + body((P, B), 0)
        O, crank, h = P, (B - P) / c, c/2
    return dict(steps=360, check=[0, 1, 90, 359], loops=loops, pins=pins, q0=q0,
                note="chain of N loops = the first N loops, 2N+1 bodies, 3N+1 pins, 3(2N+1) q0; loop i: crank arm a at angle off "
                     "in the previous follower's frame (origin its pivot, x towards its B; loop 0: the crank, pivot (0,0)); "
                     "out: B of the last loop = [2N+1, c/2, 0] and the last follower")

def flat(cases, d):
    w = lambda name, *rows: open(f"{d}/{name}.txt", "w").write("\n".join(" ".join(repr(v) for v in r) for r in rows) + "\n")
    s, f = cases["slider_crank"], cases["four_bar"]
    head = lambda m: [m["steps"], len(m["check"]), *m["check"]]
    w("slider_crank", head(s), [s["r"], s["l"], s["e"]])
    dy = lambda m: [m["a"], m["b"], m["c"], *m["O4"], m["branch"]]
    w("four_bar", head(f), dy(f) + f["P"])
    for k in ("sixbar_watt", "sixbar_steph"):
        m = cases[k]
        w(k, head(m), dy(m) + [int(m["base"] == "follower"), *m["Q"], m["b2"], m["c2"], *m["O6"], m["branch2"]], m["th0"])
        w(k + ".body", head(m), [len(m["q0"])//3, len(m["pins"])], *m["pins"], m["out"], m["q0"])
    m = cases["chain"]
    for n in (1, 3, 10, 30, 100, 330):
        w(f"chain{n}", head(m), [n], *([l["off"], l["a"], l["b"], l["c"], *l["O"], l["branch"]] for l in m["loops"][:n]))
        w(f"chain{n}.body", head(m), [2*n+1, 3*n+1], *m["pins"][:3*n+1], [2*n+1, m["loops"][n-1]["c"]/2, 0.], m["q0"][:6*n+3])

if __name__ == "__main__":
    if sys.argv[1] == "gen":
        out = dict(COMMON, slider_crank=SLIDER, lever=LEVER, four_bar=FOUR, sixbar_watt=sixbar(WATT), sixbar_steph=sixbar(STEPH), chain=chain(330))
        json.dump(out, open("cases.json", "w"))
    else:
        flat(json.load(open("cases.json")), sys.argv[2])
