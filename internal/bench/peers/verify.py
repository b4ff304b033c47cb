#!/usr/bin/python3
"""ref.json: the eight outputs at the check steps of every case, at 50 digits: positions by circle intersection in mpmath,
velocities and accelerations by numerical differentiation in time, so independent of every formula in the peers."""
import json, sys
from mpmath import mp, mpf, mpc, sqrt, pi, expj, conj, diffs
mp.dps = 50
cases = json.load(open("cases.json"))
Z = lambda p: mpc(mpf(p[0]), mpf(p[1]))

def dyad(A, C, b, c, s):
    D = C - A; d2 = abs(D)**2; b, c = mpf(b), mpf(c); u = (d2 + b*b - c*c) / (2*d2)
    return A + D * (u + 1j*s*sqrt(b*b/d2 - u*u))

def slider(m, phi):
    A = mpf(m["r"]) * expj(phi); e, l = mpf(m["e"]), mpf(m["l"])
    B = mpc(A.real + sqrt(l*l - (e - A.imag)**2), e)
    return B, (B - A) / l

def lever(m, phi):
    d, e = mpf(m["r"]) * expj(phi) + mpf(m["c"]), mpf(m["e"])
    s = sqrt(abs(d)**2 - e*e)
    return mpc(s, e), d / mpc(s, e)

def four(m, phi):
    A, O4 = mpf(m["a"]) * expj(phi), Z(m["O4"])
    B = dyad(A, O4, m["b"], m["c"], m["branch"]); ab, cb = (B - A) / mpf(m["b"]), (B - O4) / mpf(m["c"])
    return (A + ab * Z(m["P"]), cb) if "P" in m else (O4 + cb * Z(m["Q"]) if m["base"] == "follower" else A + ab * Z(m["Q"]))

def six(m, phi):
    O6 = Z(m["O6"]); D = dyad(four(m, phi), O6, m["b2"], m["c2"], m["branch2"])
    return D, (D - O6) / mpf(m["c2"])

def chain(m, phi):
    O, u = mpc(0), expj(phi)
    for l in m["loops"]:
        A, P = O + u * mpf(l["a"]) * expj(mpf(l["off"])), Z(l["O"])
        B = dyad(A, P, l["b"], l["c"], l["branch"]); u, O = (B - P) / mpf(l["c"]), P
    return B, u

def out8(f, m, k):
    phi, w, al = 2*pi*k/m["steps"], 10 + k % 7, -3 + k % 11
    memo = {}
    def g(t):
        if t not in memo: memo[t] = f(m, phi + w*t + al*t*t/2)
        return memo[t]
    p, v, a = diffs(lambda t: g(t)[0], mpf(0), 2)
    u, du, ddu = diffs(lambda t: g(t)[1], mpf(0), 2)
    return [float(x) for x in (p.real, p.imag, v.real, v.imag, a.real, a.imag, (conj(u)*du).imag, (conj(u)*ddu).imag)]

ref = {}
todo = [("slider_crank", slider, cases["slider_crank"]), ("lever", lever, cases["lever"]), ("four_bar", four, cases["four_bar"])]
todo += [(k, six, cases[k]) for k in ("sixbar_watt", "sixbar_steph")]
todo += [(f"chain{n}", chain, dict(cases["chain"], loops=cases["chain"]["loops"][:n])) for n in (1, 3, 10, 30, 100, 330)]
for name, f, m in todo: ref[name] = {str(k): out8(f, m, k) for k in m["check"]}
json.dump(ref, open("ref.json", "w"), indent=0)
