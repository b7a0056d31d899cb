"""The mode table: damping of every kind, free and double roots, ratios far apart, effective mass, sensitivities."""

import math

import mpmath as mp
import numpy as np
import scipy.linalg as la

from features.book import model
from features.mechanics import TAU, History, System

EIG = "SciPy: eigh(K, M) and eig of the state matrix"


def checks_of(roots, stability=True):
    out = []
    for i, z in enumerate(roots, 1):
        out += [(f"damping_ratio({i})", -z.real / abs(z), ""), (f"damped_frequency({i})", z.imag / TAU, "Hz")]
    return out + ([("stability_margin()", min(-z.real for z in roots), "1/s")] if stability else [])


s = System("a b c").mass("a", 5).mass("b", 8).mass("c", 3)
s.spring("a", "ground", 2e4).spring("a", "b", 1.2e4).spring("b", "c", 7e3).damper("b", "ground", 25)
M, C, K = s.matrices()
extra = 0.6 * M + 2e-4 * K + s.modal_damping([0.01] * 3)
f = s.frequencies()
model("damping-of-the-model", EIG + "; C + a M + b K + M Phi diag(2 z w) Phi' M", """
assume mass_damping = 0.6 1/s
assume stiffness_damping = 0.2 ms
assume modal_damping = 1 %
mass a = 5 kg
mass b = 8 kg
mass c = 3 kg
spring one between a and ground = 20 kN/m
spring two between a and b = 12 kN/m
spring three between b and c = 7 kN/m
damper oil between b and ground = 25 N*s/m
force f on c
    amplitude = 1 N
    frequency = 6 Hz
ask sweep s
    of = c.displacement
    from = 1 Hz
    to = 30 Hz
""", [(f"natural_frequency({i + 1})", f[i], "Hz") for i in range(3)] + checks_of(s.roots(extra)) + [
    ("value(s, c.displacement, at: 6 Hz)", abs(la.solve(K + 1j * TAU * 6 * (C + extra) - (TAU * 6) ** 2 * M, [0, 0, 1])[2]), "m"),
    ("value(s, two.force, at: 6 Hz)", abs((lambda x: (1.2e4 + 1j * TAU * 6 * 2e-4 * 1.2e4) * (x[0] - x[1]))(la.solve(K + 1j * TAU * 6 * (C + extra) - (TAU * 6) ** 2 * M, [0, 0, 1]))), "N"),
])

s = System("a b").mass("a", 5).mass("b", 8).spring("a", "ground", 2e4, 0.1).spring("a", "b", 1.2e4, 0.3).damper("b", "ground", 5)
ratios = s.loss_ratios()
C2 = s.modal_damping(ratios)
h = History(s, 1.5, {"b": lambda t: 20.0}, extra_c=C2)
x = s.steady(6, {"b": 1})
model("loss-factors", EIG + "; z = sum of eta times energy share / 2 in roots and in time, k (1 + i eta) in sweeps", """
mass a = 5 kg
mass b = 8 kg
spring one between a and ground = 20 kN/m
    loss_factor = 0.1
spring two between a and b = 12 kN/m
    loss_factor = 0.3
damper oil between b and ground = 5 N*s/m
force f on b
    amplitude = 1 N
    frequency = 6 Hz
force push on b
    step = 20 N
ask sweep s
    of = b.displacement
    by = f
    from = 1 Hz
    to = 30 Hz
ask history h
    of = b.displacement
    by = push
    lasting = 1.5 s
""", checks_of(s.roots(C2)) + [
    ("value(s, b.displacement, at: 6 Hz)", abs(x["b"]), "m"), ("phase(s, a.displacement, at: 6 Hz)", np.angle(x["a"]), ""),
    ("value(s, two.force, at: 6 Hz)", abs(1.2e4 * (1 + 0.3j) * (x["a"] - x["b"])), "N"),
    ("value(s, two.power, at: 6 Hz)", 0.5 * TAU * 6 * 0.3 * 1.2e4 * abs(x["a"] - x["b"]) ** 2, "W"),
    ("value(h, b.displacement, at: 0.8 s)", h.at(0.8)["b"][0], "m", 1e-8), ("peak(h, b.displacement)", h.peak(lambda m: m["b"][0]), "m", 1e-7),
])

s = System("m").mass("m", 10).spring("m", "ground", 4e3).damper("m", "ground", 2 * 0.05 * 4e3 / (TAU * 12))
model("damping-ratio-of-a-spring", "c = 2 z k / w beside the spring, closed form", """
mass m = 10 kg
spring k between m and ground = 4 kN/m
    damping_ratio = 5 % at 12 Hz
force f on m
    amplitude = 1 N
    frequency = 6 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 30 Hz
""", [
    ("damping_ratio(1)", 2 * 0.05 * 4e3 / (TAU * 12) / (2 * math.sqrt(4e4)), ""),
    ("value(s, k.force, at: 3 Hz)", abs((4e3 + 1j * TAU * 3 * s.C[0, 0]) * s.steady(3, {"m": 1})["m"]), "N"),
    ("transmissibility(s, k, at: 3 Hz)", abs((4e3 + 1j * TAU * 3 * s.C[0, 0]) * s.steady(3, {"m": 1})["m"]), ""),
])

model("critically-damped", "x = (x0 + (v0 + w x0) t) exp(-w t), closed form", """
mass m = 4 kg
    starts_at = 10 mm
    starts_moving = -0.3 m/s
spring k between m and ground = 400 N/m
damper c between m and ground = 80 N*s/m
force still on m
    step = 0 N
ask history h
    of = m.displacement
    lasting = 2 s
""", [
    ("damping_ratio(1)", 1, "", 1e-7), ("damped_frequency(1)", 0, "Hz", None, 1e-6), ("stability_margin()", 10, "1/s", 1e-6),
    ("value(h, m.displacement, at: 0.2 s)", (0.01 + (-0.3 + 0.1) * 0.2) * math.exp(-2), "m", 1e-10),
    ("value(h, m.velocity, at: 0.2 s)", (-0.2 - 10 * (0.01 - 0.2 * 0.2)) * math.exp(-2), "m/s", 1e-10),
    ("lowest(h, m.displacement)", (0.01 - 0.2 * 0.15) * math.exp(-1.5), "m", 1e-8),
    ("least(h, m.displacement)", 0, "m", None, 1e-15),
    ("least_at(h, m.displacement)", 0.05, "s", 1e-8),
])

s = System("a b").mass("a", 2).mass("b", 2).spring("a", "ground", 200).spring("b", "ground", 200).spring("a", "b", 150).damper("a", "ground", 40).damper("b", "ground", 40)
r2 = -10 + 1j * math.sqrt(500 / 2 - 100)
h = History(s, 1.0, x0={"a": 0.02}, v0={"b": 0.1})
model("critically-damped-in-one-of-two", "double root -10 of the first mode, closed form; SciPy: solve_ivp", """
mass a = 2 kg
    starts_at = 20 mm
mass b = 2 kg
    starts_moving = 0.1 m/s
spring one between a and ground = 200 N/m
spring two between b and ground = 200 N/m
spring link between a and b = 150 N/m
damper oil between a and ground = 40 N*s/m
damper tar between b and ground = 40 N*s/m
force still on a
    step = 0 N
ask history h
    of = a.displacement
    lasting = 1 s
""", [
    ("damping_ratio(1)", 1, "", 1e-7), ("damping_ratio(2)", 10 / abs(r2), ""), ("damped_frequency(2)", r2.imag / TAU, "Hz"),
    ("value(h, a.displacement, at: 0.3 s)", h.at(0.3)["a"][0], "m", 1e-8), ("value(h, b.velocity, at: 0.3 s)", h.at(0.3)["b"][1], "m/s", 1e-8),
    ("value(h, oil.force, at: 0.3 s)", 40 * h.at(0.3)["a"][1], "N", 1e-8),
])

roots = np.roots([4, 300, 400]).real
h = lambda t: 0.01 * (roots.max() * np.exp(roots.min() * t) - roots.min() * np.exp(roots.max() * t)) / (roots.max() - roots.min())
model("overdamped", "real roots of m s^2 + c s + k, numpy.roots", """
mass m = 4 kg
    starts_at = 10 mm
spring k between m and ground = 400 N/m
damper c between m and ground = 300 N*s/m
force still on m
    step = 0 N
ask history h
    of = m.displacement
    lasting = 5 s
""", [
    ("damping_ratio(1)", 300 / 80, ""), ("damped_frequency(1)", 0, "Hz"), ("value(h, m.displacement, at: 1 s)", h(1.0), "m"),
    ("stability_margin()", -roots.max(), "1/s"), ("period_of(h, m.displacement)", None, "s"),
    ("settling_time(h, m.displacement, 5 %)", math.log(0.05 * (roots.max() - roots.min()) / -roots.min()) / roots.max(), "s", 1e-9),
], modes=[("modes.[0].realRoots.[0]", roots.min()), ("modes.[0].realRoots.[1]", roots.max()), ("modes.[0].dampedFrequencyHz", 0)])

s = System("a b c d").mass("a", 1e-3).mass("b", 2.0).mass("c", 5e4).mass("d", 0.5).spring("a", "ground", 1e9).spring("a", "b", 1e3).spring("b", "c", 1e8).spring("c", "d", 40).spring("c", "ground", 3e6)
s.damper("a", "ground", 1e-3).damper("c", "ground", 50).damper("c", "d", 1e-5)
mp.mp.dps = 40
Mm, Cm, Km = (mp.matrix(x.tolist()) for x in s.matrices())
A = mp.zeros(8)
for i in range(4):
    A[i, 4 + i] = 1
    for j in range(4):
        A[4 + i, j] = -Km[i, j] / Mm[i, i]
        A[4 + i, 4 + j] = -Cm[i, j] / Mm[i, i]
ev = sorted((complex(z) for z in mp.eig(A, left=False, right=False) if mp.im(z) > 0), key=abs)
A0 = mp.matrix(4)
for i in range(4):
    for j in range(4):
        A0[i, j] = Km[i, j] / mp.sqrt(Mm[i, i] * Mm[j, j])
w2 = sorted(float(mp.sqrt(x)) for x in mp.eigsy(A0, eigvals_only=True))
model("far-apart-stiffnesses", "mpmath at 40 digits: eig of the state matrix", """
mass a = 1 g
mass b = 2 kg
mass c = 50 t
mass d = 0.5 kg
spring one between a and ground = 1 GN/m
spring two between a and b = 1 N/mm
spring three between b and c = 100 MN/m
spring four between c and d = 40 N/m
spring base between c and ground = 3 MN/m
damper dry between a and ground = 1 mN*s/m
damper slab between c and ground = 50 N*s/m
damper wire between c and d = 1e-5 N*s/m
""", [(f"natural_frequency({i + 1})", w / TAU, "Hz", 1e-11) for i, w in enumerate(w2)]
    + [(f"damping_ratio({i + 1})", -z.real / abs(z), "", 1e-6) for i, z in enumerate(ev)])

model("sharp-peak", "1/(2 z) at r = sqrt(1 - 2 z^2), closed form", """
mass m = 1 kg
spring k between m and ground = 10 kN/m
damper c between m and ground = 0.2e-3 N*s/m
force f on m
    amplitude = 1 N
    frequency = 3 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 50 Hz
""", [
    ("peak(s, m.displacement)", 1e-4 / (2e-6 * math.sqrt(1 - 1e-12)), "m", 1e-9), ("damping_ratio(1)", 1e-6, "", 1e-9),
    ("peak_at(s, m.displacement)", 100 * math.sqrt(1 - 2e-12) / TAU, "Hz", 1e-9),
    ("bandwidth(s, m.displacement)", 100 * (math.sqrt(1 - 2e-12 + 2e-6 * math.sqrt(1 + 1e-12)) - math.sqrt(1 - 2e-12 - 2e-6 * math.sqrt(1 + 1e-12))) / TAU, "Hz", 1e-6),
])

s = System("a b c").mass("a", 3).mass("b", 4).mass("c", 5).spring("a", "b", 1e3).spring("b", "c", 2e3).damper("a", "b", 6)
h = History(s, 2.0, {"c": lambda t: 12.0 if t < 0.5 else 0.0}, v0={"a": 0.2}, breaks=[0.5])
f = s.frequencies()
model("free-free-drifting", EIG + "; SciPy: solve_ivp DOP853; the centre of gravity in closed form", """
mass a = 3 kg
    starts_moving = 0.2 m/s
mass b = 4 kg
mass c = 5 kg
spring ab between a and b = 1 N/mm
spring bc between b and c = 2 N/mm
damper oil between a and b = 6 N*s/m
force push on c
    pulse = rectangle
    peak = 12 N
    duration = 0.5 s
ask history h
    of = a.displacement
    lasting = 2 s
""", [
    ("natural_frequency(1)", f[1], "Hz"), ("natural_frequency(2)", f[2], "Hz"), ("value(h, a.displacement, at: 2 s)", h.at(2.0)["a"][0], "m", 1e-9),
    ("value(h, 0.25 * a.displacement + b.displacement * (1/3) + (5/12) * c.displacement, at: 2 s)", 0.05 * 2 + 0.125 + 0.5 * 1.5, "m", 1e-10),
    ("value(h, c.acceleration, at: 0.25 s)", h.at(0.25)["c"][2], "m/s^2", 1e-8), ("peak(h, bc.force)", h.peak(lambda m: 2e3 * (m["b"][0] - m["c"][0])), "N", 1e-7),
    ("damping_ratio(1)", (lambda z: -z.real / abs(z))([z for z in s.roots() if z.imag > 1e-3][0]), "", 1e-8),
], modes=[("modes.[0].number", 0), ("modes.[0].frequencyHz", 0), ("modes.[0].dampingRatio", None), ("modes.[0].effectiveMass.line", 1),
          ("modes.[1].effectiveMass.line", 0, None, 1e-12)])

s = System("cart wheel load").mass("cart", 30).mass("wheel", 0.8).mass("load", 12).bind("wheel", cart=5).spring("cart", "ground", 4e4).spring("cart", "load", 9e3)
M, C, K = s.matrices()
w2, phi = la.eigh(K, M)
line = [(phi[:, i] @ np.array([30, 12])) ** 2 / 42 for i in range(2)]
turn = [(5 * phi[0, i] * 0.8) ** 2 / 0.8 for i in range(2)]
model("effective-mass-sliding-and-turning", EIG + "; (phi' M r)^2 over r' M r for each direction", """
mass cart = 30 kg
inertia wheel = 0.8 kg*m^2
mass load = 12 kg
let per_metre = 5 rad/m
bind wheel = per_metre * cart
spring buffer between cart and ground = 40 kN/m
spring hook between cart and load = 9 kN/m
""", [
    ("natural_frequency(1)", math.sqrt(w2[0]) / TAU, "Hz"), ("natural_frequency(2)", math.sqrt(w2[1]) / TAU, "Hz"),
    ("effective_mass(1)", None, ""),
], modes=[("modes.[0].effectiveMass.line", line[0]), ("modes.[1].effectiveMass.line", line[1]),
          ("modes.[0].effectiveMass.turn", turn[0]), ("modes.[1].effectiveMass.turn", turn[1])])

s = System("a b").mass("a", 5).mass("b", 8).spring("a", "ground", 2e4).spring("a", "b", 1.2e4).damper("b", "ground", 25)


def freq(k2, m=8.0, n=0):
    t = System("a b").mass("a", 5).mass("b", m).spring("a", "ground", 2e4).spring("a", "b", k2)
    return t.frequencies()[n]


def response(k2):
    t = System("a b").mass("a", 5).mass("b", 8).spring("a", "ground", 2e4).spring("a", "b", k2).damper("b", "ground", 25)
    return abs(t.steady(5, {"b": 1})["a"])


def relative(f, p):
    d = 1e-3
    return (8 * (f(p * (1 + d)) - f(p * (1 - d))) - (f(p * (1 + 2 * d)) - f(p * (1 - 2 * d)))) / (12 * d * f(p))


model("sensitivities", "fourth-order differences of SciPy answers", """
let link = 12 kN/m
let load = 8 kg
mass a = 5 kg
mass b = load
spring one between a and ground = 20 kN/m
spring two between a and b = link
damper oil between b and ground = 25 N*s/m
force f on b
    amplitude = 1 N
    frequency = 5 Hz
ask sweep s
    of = b.displacement
    from = 1 Hz
    to = 30 Hz
""", [
    ("sensitivity(natural_frequency(1), link)", relative(freq, 1.2e4), "", 1e-7),
    ("sensitivity(natural_frequency(2), link)", relative(lambda k: freq(k, n=1), 1.2e4), "", 1e-7),
    ("sensitivity(natural_frequency(1), load)", relative(lambda m: freq(1.2e4, m), 8.0), "", 1e-7),
    ("sensitivity(value(s, a.displacement, at: 5 Hz), link)", relative(response, 1.2e4), "", 1e-6),
    ("sensitivity(link, link)", 1, "", 1e-9), ("sensitivity(2 * natural_frequency(1) + natural_frequency(2), link)", (2 * freq(1.2e4) * relative(freq, 1.2e4) + freq(1.2e4, n=1) * relative(lambda k: freq(k, n=1), 1.2e4)) / (2 * freq(1.2e4) + freq(1.2e4, n=1)), "", 1e-7),
])

model("statics", "weights over springs, by hand; preloads left out, every mass pulled along its positive direction", """
assume gravity = 2 m/s^2
mass upper = 10 kg
    weight = negative
mass lower = 30 kg
junction seat
spring one between upper and lower = 4 kN/m
    preload = 7 N
spring two between lower and seat = 10 kN/m
    count = 2
spring three between seat and ground = 20 kN/m
spring back between ground and lower = 5 kN/m
group feet = three, back
""", [
    ("static_deflection(one)", 20 / 4e3, "m"), ("static_force(one)", 20, "N"),
    ("static_deflection(two)", 80 / (10e3 + 5e3) * 0.5, "m"), ("static_force(two)", 80 * 10 / 15, "N"),
    ("static_force(three)", 80 * 10 / 15, "N"), ("static_force(back)", 80 * 5 / 15, "N"),
    ("static_force(feet)", 80 * 10 / 15 - 80 * 5 / 15, "N"),
])
