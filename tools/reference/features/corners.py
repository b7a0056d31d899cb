"""Corners: supports that jump under inerters, binds to supports, differential levers, damping against moving supports."""

import math

import numpy as np

from features.book import model
from features.mechanics import TAU, History, System

IVP = "SciPy: solve_ivp DOP853 at 3e-13 between the breaks"
SOLVE = "NumPy: solve (K + i w C - w^2 M) X = F"

# M x'' + C x' + K x = M_s s'' + C_s s' + K_s s with s a step: with y = x - r s, r = b/(m + b), the jump is in y's start
m, b, k, c = 6.0, 2.0, 900.0, 14.0
s = System("m", "floor").mass("m", m).inerter("m", "floor", b).spring("m", "floor", k).damper("m", "floor", c)
r = b / (m + b)
lift = 4e-3
# velocity jump: (m + b) dv = c s (1 - r), because the damper force on the impulse of s' counts the jump of x too
h = History(s, 0.8, supports={"floor": lambda t: (lift, 0.0, 0.0)}, x0={"m": r * lift}, v0={"m": c * lift * (1 - r) / (m + b)})
vj = 0.05
h2 = History(s, 0.8, supports={"floor": lambda t: (vj * t, vj, 0.0)}, v0={"m": r * vj})
law = lambda t: (3e-3 * (1 - math.exp(-t / 0.1)), 3e-2 * math.exp(-t / 0.1), -0.3 * math.exp(-t / 0.1))
h3 = History(s, 0.8, supports={"floor": law}, v0={"m": r * 3e-2})
model("inerter-on-a-jumping-base", "jumps by hand from M x'' + C x' + K x; " + IVP, """
support floor
mass m = 6 kg
inerter b between m and floor = 2 kg
spring k between m and floor = 900 N/m
damper c between m and floor = 14 N*s/m
motion lift of floor
    step = 4 mm
motion walk of floor
    step = 50 mm/s
motion creep of floor
    law = 3 mm * (1 - exp(-t / 0.1 s))
ask history a
    of = m.displacement
    by = lift
    lasting = 0.8 s
ask history w
    of = m.displacement
    by = walk
    lasting = 0.8 s
ask history l
    of = m.displacement
    by = creep
    lasting = 0.8 s
""", [
    ("value(a, m.displacement, at: 0 s)", r * lift, "m", 1e-9), ("value(a, m.displacement, at: 0.3 s)", h.at(0.3)["m"][0], "m", 1e-8), ("value(a, m.velocity, at: 0.3 s)", h.at(0.3)["m"][1], "m/s", 1e-8),
    ("value(w, m.velocity, at: 0 s)", r * vj, "m/s", 1e-9), ("value(w, m.displacement, at: 0.3 s)", h2.at(0.3)["m"][0], "m", 1e-8), ("value(l, m.displacement, at: 0.3 s)", h3.at(0.3)["m"][0], "m", 1e-8),
    ("value(l, b.force, at: 0.3 s)", b * (h3.at(0.3)["m"][2] - law(0.3)[2]), "N", 1e-7),
])

s = System("a b rider link", "floor").mass("a", 4).mass("b", 9).mass("rider", 2).spring("a", "ground", 3e3).spring("b", "ground", 5e3).spring("link", "ground", 800)
s.damper("a", "ground", 8).damper("b", "ground", 10)
s.T[s.all.index("link")] = 0.3 * s.T[s.all.index("a")] + 0.7 * s.T[s.all.index("b")]
s.names.remove("link")
s.T[s.all.index("rider")] = 0.5 * s.T[s.all.index("a")] + 0.5 * s.T[s.all.index("floor")]
s.names.remove("rider")
move = lambda t: (2e-3 * math.sin(11 * t), 22e-3 * math.cos(11 * t), -242e-3 * math.sin(11 * t))
h = History(s, 1.0, supports={"floor": move}, v0={"a": -(2 * 0.5 * 0.5 * 22e-3) / (4 + 2 * 0.25)})
x = s.steady(2, supports={"floor": 1e-3})
model("differential-lever-and-bound-support", SOLVE + "; " + IVP + "; the velocity of the support starts at once and kicks what is bound to it", """
support floor
mass a = 4 kg
mass b = 9 kg
mass rider = 2 kg
junction link
bind link = 0.3 * a + 0.7 * b
bind rider = 0.5 * a + 0.5 * floor
spring ka between a and ground = 3 kN/m
spring kb between b and ground = 5 kN/m
spring kl between link and ground = 0.8 kN/m
damper ca between a and ground = 8 N*s/m
damper cb between b and ground = 10 N*s/m
motion shake of floor
    amplitude = 2 mm
    frequency = 11 rad/s
    phase = -90 deg
motion probe of floor
    amplitude = 1 mm
    frequency = 2 Hz
ask sweep s
    of = a.displacement
    by = probe
    from = 1 Hz
    to = 20 Hz
ask history h
    of = a.displacement
    by = shake
    lasting = 1 s
""", [
    ("natural_frequency(1)", s.frequencies()[0], "Hz"), ("natural_frequency(2)", s.frequencies()[1], "Hz"), ("value(s, a.displacement, at: 2 Hz)", abs(x["a"]), "m"),
    ("value(s, rider.displacement, at: 2 Hz)", abs(x["rider"]), "m"), ("value(s, link.displacement, at: 2 Hz)", abs(0.3 * x["a"] + 0.7 * x["b"]), "m"),
    ("value(h, a.displacement, at: 0.6 s)", h.at(0.6)["a"][0], "m", 1e-8), ("value(h, rider.acceleration, at: 0.6 s)", h.at(0.6)["rider"][2], "m/s^2", 1e-8),
    ("value(h, kl.force, at: 0.6 s)", 800 * (0.3 * h.at(0.6)["a"][0] + 0.7 * h.at(0.6)["b"][0]), "N", 1e-8),
])

# Modal damping and loss factors against a moving support: damping of the motion relative to what the springs would follow
m, k = 5.0, 2e3
w = math.sqrt(k / m)
c = 2 * 0.06 * w * m
s = System("m", "floor").mass("m", m).spring("m", "floor", k).damper("m", "floor", c)
walk = History(s, 3.0, supports={"floor": lambda t: (0.03 * t, 0.03, 0.0)})
x = s.steady(3, supports={"floor": 1e-3})
for name, detail, assume, sweeps in (("modal-damping-on-a-moving-base", "", "assume modal_damping = 6 %\n", True), ("loss-factor-on-a-moving-base", "\n    loss_factor = 12 %", "", False)):
    model(name, IVP + "; one mass: a damper 2 z w m beside the spring, so a base that walks steadily is followed", assume + f"""
support floor
mass m = 5 kg
spring k between m and floor = 2 kN/m{detail}
motion walk of floor
    step = 30 mm/s
motion shake of floor
    amplitude = 1 mm
    frequency = 3 Hz
ask history h
    of = m.displacement
    by = walk
    lasting = 3 s
ask sweep s
    of = m.displacement
    by = shake
    from = 1 Hz
    to = 20 Hz
""", [
        ("value(h, m.displacement, at: 0.7 s)", walk.at(0.7)["m"][0], "m", 1e-8), ("value(h, k.travel, at: 2.9 s)", walk.at(2.9)["m"][0] - 0.03 * 2.9, "m", None, 1e-10),
        ("value(s, m.displacement, at: 3 Hz)", abs(x["m"]) if sweeps else abs(1e-3 * k * (1 + 0.12j) / (k * (1 + 0.12j) - m * (TAU * 3) ** 2)), "m"),
    ])

m = 3.0
f = lambda t: 9 * math.cos(5 * t + 0.4)
free = lambda t: 9 / (m * 25) * (math.cos(0.4) - math.cos(5 * t + 0.4)) - 9 / (m * 5) * math.sin(0.4) * t + 2e-3 + 0.05 * t
s = System("a b").mass("a", 3).mass("b", 5).spring("a", "b", 700).damper("a", "b", 4)
h = History(s, 2.0, {"a": lambda t: 9 * math.cos(5 * t + 0.4) + 4 * math.sin(13 * t) + 2, "b": lambda t: 6 * math.exp(-3 * t)}, x0={"b": 1e-3})
model("free-bodies-under-sines", "double integral in closed form; " + IVP, """
mass lone = 3 kg
    starts_at = 2 mm
    starts_moving = 50 mm/s
mass a = 3 kg
mass b = 5 kg
    starts_at = 1 mm
spring k between a and b = 700 N/m
damper c between a and b = 4 N*s/m
force fl on lone
    amplitude = 9 N
    frequency = 5 rad/s
    phase = 0.4 rad
force f1 on a
    amplitude = 9 N
    frequency = 5 rad/s
    phase = 0.4 rad
force f2 on a
    amplitude = 4 N
    frequency = 13 rad/s
    phase = -90 deg
force f3 on a
    step = 2 N
force f4 on b
    law = 6 N * exp(-t / (1 s / 3))
ask history h
    of = lone.displacement
    lasting = 2 s
""", [
    ("value(h, lone.displacement, at: 1.7 s)", free(1.7), "m", 1e-10), ("value(h, a.displacement, at: 1.7 s)", h.at(1.7)["a"][0], "m", 1e-8), ("value(h, b.velocity, at: 1.7 s)", h.at(1.7)["b"][1], "m/s", 1e-8),
    ("peak(h, k.force)", h.peak(lambda q: 700 * (q["a"][0] - q["b"][0])), "N", 1e-7),
])

# records and pulses of a displacement through a damper: piecewise constant rates
tv, xv = np.array([0.0, 0.1, 0.25, 0.4, 0.6]), np.array([0.0, 2e-3, -1e-3, 3e-3, 3e-3])
slope = np.diff(xv) / np.diff(tv)
rec = lambda t: (float(np.interp(t, tv, xv)), float(slope[min(np.searchsorted(tv, t, side="right") - 1, 3)]), 0.0)
s = System("m", "floor").mass("m", 6).spring("m", "floor", 900).damper("m", "floor", 40)
h = History(s, 0.6, supports={"floor": rec}, breaks=list(tv[1:-1]))


def trap(t):
    rise, T, fall, p = 0.03, 0.2, 0.05, 5e-3
    if t < rise:
        return (p * t / rise, p / rise, 0.0)
    if t < T - fall:
        return (p, 0.0, 0.0)
    if t < T:
        return (p * (T - t) / fall, -p / fall, 0.0)
    return (0.0, 0.0, 0.0)


h2 = History(s, 0.6, supports={"floor": trap}, breaks=[0.03, 0.15, 0.2])
turn = lambda t: TAU * (1 * t + (6 - 1) * t * t / (2 * 2.0))
rate = lambda t: TAU * (1 + 5 * t / 2.0)
chirp = lambda t: (2e-3 * math.cos(turn(t)), -2e-3 * rate(t) * math.sin(turn(t)), 0.0)
h3 = History(s, 2.0, supports={"floor": chirp}, v0={"m": 40 * 2e-3 / 6})
model("displacements-through-a-damper", IVP + "; a jump of the base through the damper is an impulse c s", """
support floor
mass m = 6 kg
spring k between m and floor = 900 N/m
damper c between m and floor = 40 N*s/m
motion measured of floor
    record = "base-travel.csv"
    unit = mm
motion bump of floor
    pulse = trapezoid
    peak = 5 mm
    duration = 0.2 s
    rise = 30 ms
    fall = 50 ms
motion run of floor
    chirp = from 1 Hz to 6 Hz
    amplitude = 2 mm
    lasting = 2 s
ask history r
    of = m.displacement
    by = measured
    lasting = 0.6 s
ask history b
    of = m.displacement
    by = bump
    lasting = 0.6 s
ask history cc
    of = m.displacement
    by = run
    lasting = 2 s
""", [
    ("value(r, m.displacement, at: 0.5 s)", h.at(0.5)["m"][0], "m", 1e-8), ("peak(r, c.force)", h.peak(lambda q: 40 * (q["m"][1] - q["floor"][1])), "N", 1e-7),
    ("value(b, m.displacement, at: 0.5 s)", h2.at(0.5)["m"][0], "m", 1e-8), ("peak(b, m.acceleration)", h2.peak(lambda q: q["m"][2]), "m/s^2", 1e-7),
    ("value(cc, m.displacement, at: 1.9 s)", h3.at(1.9)["m"][0], "m", 1e-7),
], files={"base-travel.csv": "t,s\n" + "".join(f"{t:g},{x * 1e3:g}\n" for t, x in zip(tv, xv))})

s = System("m", "floor").mass("m", 5).spring("m", "floor", 2e3).damper("m", "floor", 9)
M, C, K = s.matrices()
al, be = 0.8, 1e-3
f = 3.0
w = TAU * f
rhs = (K[0, 0] + 1j * w * (9 + be * 2e3)) * 1e-3
model("proportional-damping-on-a-base", "M x'' + (c + b k)(x' - s') + a m x' + k (x - s) = 0, by hand: a m brakes against the ground", """
assume mass_damping = 0.8 1/s
assume stiffness_damping = 1 ms
support floor
mass m = 5 kg
spring k between m and floor = 2 kN/m
damper c between m and floor = 9 N*s/m
motion shake of floor
    amplitude = 1 mm
    frequency = 3 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 20 Hz
""", [
    ("value(s, m.displacement, at: 3 Hz)", abs(rhs / (2e3 + 1j * w * (9 + be * 2e3 + al * 5) - 5 * w * w)), "m"), ("damping_ratio(1)", (9 + 2 + 4) / (2 * math.sqrt(1e4)), ""),
])

s = System("m n").mass("m", 10).mass("n", 4).spring("m", "ground", 5e3).spring("n", "m", 3e3).damper("m", "ground", 40).damper("n", "m", 10)
eq = np.linalg.solve(s.matrices()[2], [12.0 - 10 * 3, -4 * 3])
h = History(s, 1.0, {"m": lambda t: 12.0 - 30, "n": lambda t: -12.0 + 5 * math.sin(20 * t)}, x0={"m": eq[0], "n": eq[1]})
model("at-rest-under-standing-loads", IVP + "; a step that began before t = 0 stands already", """
assume gravity = 3 m/s^2
mass m = 10 kg
    weight = negative
mass n = 4 kg
    weight = negative
spring k between m and ground = 5 kN/m
spring l between n and m = 3 kN/m
damper c between m and ground = 40 N*s/m
damper d between n and m = 10 N*s/m
force standing on m
    step = 12 N
    start = -1 s
force swing on n
    amplitude = 5 N
    frequency = 20 rad/s
    phase = -90 deg
ask history h
    of = m.displacement
    lasting = 1 s
    start = at_rest
    step = 0.3 s
""", [
    ("value(h, m.displacement, at: 0 s)", eq[0], "m"), ("value(h, n.displacement, at: 0.8 s)", h.at(0.8)["n"][0], "m", 1e-8), ("value(h, ground.reaction, at: 0 s)", 5e3 * eq[0], "N"),
    ("static_deflection(l)", 12 / 3e3, "m"),
], modes=[("answers.h.timeS", [0, 0.3, 0.6, 0.9], 1e-12), ("answers.h.series.[m.displacement].values.[0]", eq[0])])
