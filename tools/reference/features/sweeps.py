"""Steady answers: several drives, spacing, extremes, widths, limits, quantities, anti-resonances."""

import math

import numpy as np
from scipy.optimize import brentq

from features.book import model
from features.mechanics import TAU, System, peak_of

SOLVE = "NumPy: solve (K + i w C - w^2 M) X = F; extremes by scipy.optimize"

TWO = """
mass a = 20 kg
mass b = 6 kg
spring one between a and ground = 60 kN/m
spring two between a and b = 15 kN/m
damper oil between a and ground = 80 N*s/m
damper tar between a and b = 14 N*s/m
"""


def two():
    s = System("a b").mass("a", 20).mass("b", 6).spring("a", "ground", 6e4).spring("a", "b", 1.5e4)
    return s.damper("a", "ground", 80).damper("a", "b", 14)


def unbalance(hz, u, phase=0.0):
    return u * (TAU * hz) ** 2 * np.exp(1j * phase)


s = two()
both = lambda f: s.steady(f, {"a": unbalance(f, 0.02, math.radians(40)), "b": 30 * np.exp(-1j)})
X = lambda f: abs(both(f)["b"])
V = lambda f: TAU * f * X(f)
pk, at = peak_of(V, 2, 30)
force2 = lambda f: 1.5e4 * (both(f)["a"] - both(f)["b"]) + 1j * TAU * f * 14 * (both(f)["a"] - both(f)["b"])
base = lambda f: 6e4 * both(f)["a"] + 1j * TAU * f * 80 * both(f)["a"]
model("sweep-two-drives-with-phases", SOLVE, TWO + """
group feet = two, tar
group base = one, oil
force fan on a
    unbalance = 0.02 kg*m
    speed = 600 rpm
    phase = 40 deg
force pump on b
    amplitude = 30 N
    speed = 600 rpm
    phase = -1 rad
ask sweep s
    of = b.velocity
    by = fan, pump
    from = 2 Hz
    to = 30 Hz
""", [
    ("value(s, b.velocity, at: 9.5 Hz)", V(9.5), "m/s"), ("phase(s, b.velocity, at: 9.5 Hz)", np.angle(1j * both(9.5)["b"]), ""),
    ("peak(s, b.velocity)", pk, "m/s", 1e-9), ("peak_at(s, b.velocity)", at, "Hz", 1e-6), ("rms(s, b.velocity)", pk / math.sqrt(2), "m/s", 1e-9),
    ("least(s, b.displacement)", -peak_of(lambda f: -X(f), 2, 30)[0], "m", 1e-8), ("least_at(s, b.displacement)", peak_of(lambda f: -X(f), 2, 30)[1], "Hz", 1e-5),
    ("value(s, feet.force, at: 9.5 Hz)", abs(force2(9.5)), "N"), ("peak(s, feet.force)", peak_of(lambda f: abs(force2(f)), 2, 30)[0], "N", 1e-8),
    ("peak(s, base)", peak_of(lambda f: abs(base(f)), 2, 30)[0], "N", 1e-8), ("value(s, base.power, at: 9.5 Hz)", 0.5 * 80 * (TAU * 9.5) ** 2 * abs(both(9.5)["a"]) ** 2, "W"),
    ("transmissibility(s, base, at: 9 Hz)", None, ""), ("lowest(s, b.velocity)", -pk, "m/s", 1e-9), ("highest(s, b.velocity)", pk, "m/s", 1e-9),
])

fan = lambda f: s.steady(f, {"a": unbalance(f, 0.02)})
pump = lambda f: s.steady(1.5 * f, {"b": 30})
sums = lambda f: abs(fan(f)["b"]) * TAU * f + abs(pump(f)["b"]) * TAU * 1.5 * f
model("sweep-two-speeds", SOLVE + "; magnitudes of components at different rates are added", TWO + """
force fan on a
    unbalance = 0.02 kg*m
    speed = 600 rpm
force pump on b
    amplitude = 30 N
    speed = 450 rpm
    order = 2
    phase = 1 rad
ask sweep s
    of = b.velocity
    by = fan, pump
    from = 2 Hz
    to = 30 Hz
ask sweep turned
    of = b.velocity
    by = pump, fan
    from = 3 Hz
    to = 45 Hz
""", [
    ("value(s, b.velocity, at: 9.5 Hz)", sums(9.5), "m/s"), ("peak(s, b.velocity)", peak_of(sums, 2, 30)[0], "m/s", 1e-9),
    ("peak_at(s, b.velocity)", peak_of(sums, 2, 30)[1], "Hz", 1e-6), ("value(turned, b.velocity, at: 14.25 Hz)", sums(9.5), "m/s"),
    ("value(s, tar.power, at: 9.5 Hz)", 0.5 * 14 * ((TAU * 9.5) ** 2 * abs(fan(9.5)["a"] - fan(9.5)["b"]) ** 2 + (TAU * 14.25) ** 2 * abs(pump(9.5)["a"] - pump(9.5)["b"]) ** 2), "W"),
    ("value(s, two.energy, at: 9.5 Hz)", 0.5 * 1.5e4 * (abs(fan(9.5)["a"] - fan(9.5)["b"]) + abs(pump(9.5)["a"] - pump(9.5)["b"])) ** 2, "J"),
])

one = lambda f: s.steady(f, {"a": 1})


def width(f):
    pk, at = peak_of(f, 2, 30)
    edge = lambda lo, hi: brentq(lambda x: f(x) - pk / math.sqrt(2), lo, hi, xtol=1e-13)
    return edge(at, at * 1.08) - edge(at * 0.9, at)



log_points = [2 * (30 / 2) ** (i / 10) for i in range(11)]
even_points = [2 + 28 * i / 7 for i in range(8)]
model("sweep-spacing", SOLVE + "; the points of the spacing are kept exactly", TWO + """
force f on a
    amplitude = 1 N
    frequency = 9 Hz
force bare on b
    frequency = 9 Hz
ask sweep logs
    of = b.displacement
    by = f
    from = 2 Hz
    to = 30 Hz
    points = 11
ask sweep evens
    of = b.displacement, a.displacement
    by = f
    from = 2 Hz
    to = 30 Hz
    points = 8
    spacing = even
ask sweep unit
    of = a.displacement
    by = bare
    from = 2 Hz
    to = 30 Hz
""", [
    ("value(unit, a.displacement, at: 7 Hz)", abs(s.steady(7, {"b": 1})["a"]), "m"),
    ("bandwidth(logs, b.displacement)", width(lambda f: abs(one(f)["b"])), "Hz", 1e-7),
    ("bandwidth(logs, a.acceleration)", width(lambda f: abs(one(f)["a"]) * f * f), "Hz", 1e-7),
    ("least(logs, a.displacement)", -peak_of(lambda f: -abs(one(f)["a"]), 2, 30)[0], "m", 1e-8),
    ("least_at(logs, a.displacement)", peak_of(lambda f: -abs(one(f)["a"]), 2, 30)[1], "Hz", 1e-5),
], modes=[("answers.logs.frequencyHz", log_points, 1e-13), ("answers.evens.frequencyHz", even_points, 1e-13),
          ("answers.evens.peaks.[b.displacement].value", peak_of(lambda f: abs(one(f)["b"]), 2, 30)[0], 1e-9),
          ("answers.evens.peaks.[b.displacement].atHz", peak_of(lambda f: abs(one(f)["b"]), 2, 30)[1], 1e-6)])


def limit(points, straight):
    xs, ys = zip(*points)
    def f(x):
        if straight:
            return float(np.interp(x, xs, ys))
        return float(np.exp(np.interp(math.log(x), np.log(xs), np.log(ys))))
    return f


curve = [(4, 2e-3), (8, 1e-3), (16, 1e-3), (25, 4e-3)]
L, S = limit(curve, False), limit(curve, True)
v = lambda f: TAU * f * abs(s.steady(f, {"b": 5})["b"])
model("below-limit-curves", SOLVE + "; limits by numpy.interp, on logarithms for log_log", TWO + """
limit logs
    rows =
        4 Hz   2 mm/s
        8 Hz   1 mm/s
        16 Hz  1 mm/s
        25 Hz  4 mm/s
limit lines
    between_points = straight
    rows =
        4 Hz 2 mm/s
        8 Hz, 1 mm/s
        16 Hz 1 mm/s
        25 Hz 4 mm/s
limit effective
    of = rms
    rows =
        4 Hz   2 mm/s
        8 Hz   1 mm/s
        16 Hz  1 mm/s
        25 Hz  4 mm/s
limit stepped
    rows =
        4 Hz  1 mm/s
        8 Hz  1 mm/s
        8 Hz  4 mm/s
        25 Hz 4 mm/s
limit flat = 3 mm/s
force f on b
    amplitude = 5 N
    frequency = 9 Hz
ask sweep s
    of = b.velocity
    from = 2 Hz
    to = 40 Hz
ask sweep part
    of = b.velocity
    from = 18 Hz
    to = 40 Hz
ask sweep outside
    of = b.velocity
    from = 30 Hz
    to = 40 Hz
""", [
    ("below(s, b.velocity, logs)", peak_of(lambda f: v(f) / L(f), 4, 25)[0], "", 1e-8), ("below(s, b.velocity, lines)", peak_of(lambda f: v(f) / S(f), 4, 25)[0], "", 1e-8),
    ("below(s, b.velocity, effective)", peak_of(lambda f: v(f) / L(f), 4, 25)[0] / math.sqrt(2), "", 1e-8), ("below(s, b.velocity, flat)", peak_of(v, 2, 40)[0] / 3e-3, "", 1e-8),
    ("below(part, b.velocity, lines)", max(v(f) / S(f) for f in np.linspace(18, 25, 20001)), "", 1e-8), ("below(outside, b.velocity, logs)", None, ""),
    ("below(s, b.velocity, stepped)", max(peak_of(lambda f: v(f) / 1e-3, 4, 8)[0], peak_of(lambda f: v(f) / 4e-3, 8, 25)[0]), "", 1e-8),
])

u = System("a b").mass("a", 20).mass("b", 6).spring("a", "ground", 6e4).spring("a", "b", 1.5e4)
model("undamped-sweep", SOLVE + "; anti-resonance at sqrt(k/m), no bound at a mode", """
mass a = 20 kg
mass b = 6 kg
spring one between a and ground = 60 kN/m
spring two between a and b = 15 kN/m
force f on a
    amplitude = 1 N
    frequency = 5 Hz
ask sweep through
    of = a.displacement
    from = 2 Hz
    to = 30 Hz
ask sweep between_modes
    of = a.displacement
    from = 7.4 Hz
    to = 8.4 Hz
""", [
    ("peak(through, a.displacement)", None, "m"), ("rms(through, a.displacement)", None, "m"), ("bandwidth(through, a.displacement)", None, "Hz"),
    ("value(through, a.displacement, at: 5 Hz)", abs(u.steady(5, {"a": 1})["a"]), "m"), ("least_at(through, a.displacement)", math.sqrt(2500) / TAU, "Hz", 1e-9),
    ("least(through, a.displacement)", 0, "m", None, 1e-12),
    ("peak(between_modes, a.displacement)", max(abs(u.steady(f, {"a": 1})["a"]) for f in (7.4, 8.4)), "m", 1e-9),
], modes=[("answers.through.peaks.[a.displacement].value", None), ("modes.[0].dampingRatio", 0)])

t = System("rotor hub", "ring").mass("rotor", 0.6).mass("hub", 0.2).spring("rotor", "hub", 900).spring("hub", "ring", 2500, 0.08).damper("rotor", "hub", 0.4)
y = t.steady(8, supports={"ring": 0.01 * np.exp(0.3j)})
z = t.steady(8, {"rotor": 5})
model("sweep-turning", SOLVE, """
support ring
    kind = turning
inertia rotor = 0.6 kg*m^2
inertia hub = 0.2 kg*m^2
spring shaft between rotor and hub = 900 N*m/rad
spring clutch between hub and ring = 2.5 kN*m/rad
    loss_factor = 8 %
damper oil between rotor and hub = 0.4 N*m*s/rad
motion shake of ring
    amplitude = 0.01 rad
    frequency = 480 rpm
    phase = 0.3 rad
motion whirl of ring
    amplitude = 3 rpm
    frequency = 8 Hz
torque push on rotor
    amplitude = 5 N*m
    speed = 240 rpm
    order = 2
ask sweep s
    of = rotor.angle
    by = shake
    from = 1 Hz
    to = 30 Hz
ask sweep w
    of = rotor.angle
    by = whirl
    from = 1 Hz
    to = 30 Hz
ask sweep p
    of = rotor.angle
    by = push
    from = 1 Hz
    to = 30 Hz
""", [
    ("value(s, rotor.angle, at: 8 Hz)", abs(y["rotor"]), ""), ("value(s, rotor.speed, at: 8 Hz)", 8 * abs(y["rotor"]), "Hz"),
    ("value(s, shaft.torque, at: 8 Hz)", 900 * abs(y["rotor"] - y["hub"]), "N*m"), ("value(s, shaft.twist, at: 8 Hz)", abs(y["rotor"] - y["hub"]), ""),
    ("value(s, shaft.rate, at: 8 Hz)", 8 * abs(y["rotor"] - y["hub"]), "Hz"), ("phase(s, rotor.angle, at: 8 Hz)", np.angle(y["rotor"]), ""),
    ("transmissibility(s, rotor.angle, at: 8 Hz)", abs(y["rotor"]) / 0.01, ""), ("value(w, rotor.speed, at: 8 Hz)", 3 / 60 * abs(y["rotor"]) / 0.01, "Hz"),
    ("transmissibility(w, rotor.speed, at: 8 Hz)", abs(y["rotor"]) / 0.01, ""), ("transmissibility(p, clutch, at: 8 Hz)", abs(2500 * (1 + 0.08j) * z["hub"]) / 5, ""),
    ("value(s, ring.angle, at: 8 Hz)", 0.01, ""),
    ("peak(p, rotor.angular_acceleration)", peak_of(lambda f: (TAU * f) ** 2 * abs(t.steady(f, {"rotor": 5})["rotor"]), 1, 30)[0], "1/s^2", 1e-8),
])

g = System("m", "floor").mass("m", 40).spring("m", "floor", 3e4, own=4).damper("m", "floor", 90).inerter("m", "floor", 6).mass("m", 0)
xx = lambda f: g.steady(f, supports={"floor": 1e-3 * -1 / (TAU * f) ** 2 * 1e3})
model("base-with-inerter-and-spring-mass", SOLVE + "; support columns of M, C and K", """
support floor
mass m = 40 kg
spring k between m and floor = 30 kN/m
    mass = 4 kg
damper c between m and floor = 90 N*s/m
inerter b between m and floor = 6 kg
motion shake of floor
    amplitude = 1 m/s^2
    frequency = 4 Hz
ask sweep s
    of = m.acceleration
    from = 1 Hz
    to = 40 Hz
""", [
    ("natural_frequency(1)", math.sqrt(3e4 / (46 + 4 / 3)) / TAU, "Hz"), ("transmissibility(s, m.acceleration, at: 7 Hz)", abs(xx(7)["m"] / xx(7)["floor"]), ""),
    ("peak(s, m.acceleration)", peak_of(lambda f: (TAU * f) ** 2 * abs(xx(f)["m"]), 1, 40)[0], "m/s^2", 1e-9),
    ("value(s, k.force, at: 7 Hz)", 3e4 * abs(xx(7)["m"] - xx(7)["floor"]), "N"), ("value(s, b.force, at: 7 Hz)", 6 * (TAU * 7) ** 2 * abs(xx(7)["m"] - xx(7)["floor"]), "N"),
    ("least_at(s, m.displacement)", peak_of(lambda f: -abs(xx(f)["m"]), 1, 40)[1], "Hz", 1e-5),
])
