"""Starts, weights, preloads, resonance without damping, energies and powers, reactions, measures of histories."""

import math

import numpy as np

from features.book import model
from features.mechanics import GN, TAU, History, System

IVP = "SciPy: solve_ivp DOP853 at 3e-13 between the breaks"

s = System("a b").mass("a", 10).mass("b", 25).spring("a", "b", 8e3).spring("b", "ground", 3e4).damper("a", "b", 30).damper("b", "ground", 120)
# upper pulls a towards b with 20 N at zero travel: a gets -20, b gets +20; lower pulls b with -45 N: b gets +45
load_a, load_b = 10 * GN - 20, 25 * GN + 20 + 45
eq = np.linalg.solve(s.matrices()[2], [load_a, load_b])
h0 = History(s, 1.0, {"a": lambda t: load_a, "b": lambda t: load_b + 60})
h1 = History(s, 1.0, {"a": lambda t: load_a, "b": lambda t: load_b + 60}, x0={"a": eq[0], "b": eq[1]})
now = h0.at(0.4)
rest = h1.at(0.4)
lower = lambda m: 3e4 * m["b"][0] - 45
model("starts-with-weight-and-preload", IVP, """
mass a = 10 kg
    weight = positive
mass b = 25 kg
    weight = positive
spring upper between a and b = 8 kN/m
    preload = 20 N
spring lower between b and ground = 30 kN/m
    preload = -45 N
damper oil between a and b = 30 N*s/m
damper tar between b and ground = 120 N*s/m
force push on b
    step = 60 N
ask history written
    of = a.displacement
    by = push
    lasting = 1 s
ask history rest
    of = a.displacement
    by = push
    lasting = 1 s
    start = at_rest
""", [
    ("value(written, a.displacement, at: 0 s)", 0, "m"), ("value(written, a.displacement, at: 0.4 s)", now["a"][0], "m", 1e-9), ("value(written, upper.force, at: 0.4 s)", 8e3 * (now["a"][0] - now["b"][0]) + 20, "N", 1e-9),
    ("value(written, lower.force, at: 0.4 s)", lower(now), "N", 1e-9), ("value(rest, a.displacement, at: 0 s)", eq[0], "m"), ("value(rest, b.displacement, at: 0 s)", eq[1], "m"),
    ("value(rest, lower.force, at: 0 s)", 3e4 * eq[1] - 45, "N"), ("value(rest, a.displacement, at: 0.4 s)", rest["a"][0], "m", 1e-9),
    ("value(rest, ground.reaction, at: 0 s)", 35 * GN, "N"), ("peak(rest, lower.force)", h1.peak(lower), "N", 1e-8),
    ("value(rest, ground.reaction, at: 0.4 s)", lower(rest) + 120 * rest["b"][1], "N", 1e-9), ("lowest(written, upper.force)", h0.extreme(lambda m: 8e3 * (m["a"][0] - m["b"][0]) + 20, -1)[0], "N", 1e-8),
    ("value(rest, upper.power, at: 0.3 s)", (8e3 * (h1.at(0.3)["a"][0] - h1.at(0.3)["b"][0]) + 20) * (h1.at(0.3)["a"][1] - h1.at(0.3)["b"][1]), "W", 1e-8),
    ("value(rest, oil.power, at: 0.3 s)", 30 * (h1.at(0.3)["a"][1] - h1.at(0.3)["b"][1]) ** 2, "W", 1e-8),
    ("value(rest, upper.energy, at: 0.3 s)", 0.5 * 8e3 * (h1.at(0.3)["a"][0] - h1.at(0.3)["b"][0]) ** 2, "J", 1e-8),
    ("settling_time(rest, b.displacement, 1 mm)", h1.last_outside(lambda m: m["b"][0], eq[1] + 60 / 3e4, 1e-3), "s", 1e-8),
    ("static_force(lower)", 35 * GN, "N"),
])

w = 20.0
grow = lambda t: 3 / (2 * 5 * w) * t * math.sin(w * t)
w2 = w * 1.001
beat = lambda t: 3 / (5 * (w * w - w2 * w2)) * (math.cos(w2 * t) - math.cos(w * t))
model("undamped-resonance-in-time", "secular growth f t sin(w t) / (2 m w) and a beat, closed form", """
mass m = 5 kg
spring k between m and ground = 2 kN/m
force f on m
    amplitude = 3 N
    frequency = 20 rad/s
force g on m
    amplitude = 3 N
    frequency = 20.02 rad/s
ask history h
    of = m.displacement
    by = f
    lasting = 10 s
ask history b
    of = m.displacement
    by = g
    lasting = 40 s
""", [
    ("value(h, m.displacement, at: 7.3 s)", grow(7.3), "m", 1e-9), ("value(h, m.velocity, at: 7.3 s)", 3 / 200 * (math.sin(146) + 7.3 * 20 * math.cos(146)), "m/s", 1e-9),
    ("peak(h, m.displacement)", max(abs(grow(t)) for t in np.linspace(9.6, 10, 400001)), "m", 1e-8), ("value(b, m.displacement, at: 31 s)", beat(31), "m", 1e-8),
])

s = System("a b").mass("a", 6).mass("b", 9).spring("a", "ground", 5e3).spring("a", "b", 2e3).inerter("a", "b", 3).damper("a", "b", 12).damper("b", "ground", 20)
f = lambda t: 25 * math.cos(TAU * 2 * t + 0.7)
h = History(s, 2.0, {"b": f}, x0={"a": 4e-3, "b": -2e-3}, v0={"b": 0.1})
m = h.at(1.3)
d = lambda m, i: m["a"][i] - m["b"][i]
model("energy-power-reaction", IVP, """
mass a = 6 kg
    starts_at = 4 mm
mass b = 9 kg
    starts_at = -2 mm
    starts_moving = 0.1 m/s
spring base between a and ground = 5 N/mm
spring link between a and b = 2 N/mm
inerter screw between a and b = 3 kg
damper oil between a and b = 12 N*s/m
damper air between b and ground = 20 N*s/m
group all = link, screw, oil
force f on b
    amplitude = 25 N
    frequency = 2 Hz
    phase = 0.7 rad
ask history h
    of = b.displacement
    lasting = 2 s
    accuracy = 1e-8
""", [
    ("value(h, screw.force, at: 1.3 s)", 3 * d(m, 2), "N", 1e-8), ("value(h, screw.power, at: 1.3 s)", 3 * d(m, 2) * d(m, 1), "W", 1e-8),
    ("value(h, screw.energy, at: 1.3 s)", 1.5 * d(m, 1) ** 2, "J", 1e-8), ("value(h, all.force, at: 1.3 s)", 2e3 * d(m, 0) + 12 * d(m, 1) + 3 * d(m, 2), "N", 1e-8),
    ("value(h, all.energy, at: 1.3 s)", 1e3 * d(m, 0) ** 2 + 1.5 * d(m, 1) ** 2, "J", 1e-8), ("value(h, oil.power, at: 1.3 s)", 12 * d(m, 1) ** 2, "W", 1e-8),
    ("value(h, ground.reaction, at: 1.3 s)", 5e3 * m["a"][0] + 20 * m["b"][1], "N", 1e-8), ("peak(h, all.force)", h.peak(lambda m: 2e3 * d(m, 0) + 12 * d(m, 1) + 3 * d(m, 2)), "N", 1e-8),
    ("highest(h, link.power)", h.extreme(lambda m: 2e3 * d(m, 0) * d(m, 1))[0], "W", 1e-7), ("peak(h, screw.energy)", h.peak(lambda m: 1.5 * d(m, 1) ** 2), "J", 1e-7),
    ("rms(h, a.acceleration)", h.rms(lambda m: m["a"][2]), "m/s^2", 1e-7), ("rms(h, a.displacement - b.displacement)", h.rms(lambda m: d(m, 0)), "m", 1e-7),
    ("value(h, all.travel, at: 1.3 s)", d(m, 0), "m", 1e-8), ("value(h, air.rate, at: 1.3 s)", m["b"][1], "m/s", 1e-8), ("rms(h, oil.power)", h.rms(lambda m: 12 * d(m, 1) ** 2), "W", 1e-6),
    ("value(h, a.acceleration, at: 0 s)", h.at(0.0)["a"][2], "m/s^2", 1e-8), ("peak_at(h, b.velocity)", max((h.extreme(lambda m: m["b"][1], sg) for sg in (1, -1)), key=lambda e: abs(e[0]))[1], "s", 1e-6),
])

# spring and damper in series on a base that jumps: a first-order coordinate with no inertia
s = System("m j", "floor").mass("m", 5).spring("m", "j", 4e3).damper("j", "floor", 150).spring("m", "floor", 1e3)
h = History(s, 1.0, supports={"floor": lambda t: (3e-3, 0.0, 0.0)}, x0={"j": 3e-3})
base = lambda t: (2e-3 * math.sin(9 * t), 18e-3 * math.cos(9 * t), -162e-3 * math.sin(9 * t))
h2 = History(s, 1.0, supports={"floor": base})
model("maxwell-on-a-base", IVP + "; the damper passes a jump of the base to the junction at once", """
support floor
mass m = 5 kg
junction j
spring side between m and j = 4 N/mm
damper oil between j and floor = 150 N*s/m
spring main between m and floor = 1 N/mm
motion jump of floor
    step = 3 mm
motion shake of floor
    amplitude = 2 mm
    frequency = 9 rad/s
    phase = -90 deg
ask history a
    of = m.displacement
    by = jump
    lasting = 1 s
ask history b
    of = m.displacement
    by = shake
    lasting = 1 s
""", [
    ("value(a, m.displacement, at: 0.5 s)", h.at(0.5)["m"][0], "m", 1e-9), ("value(a, j.displacement, at: 0.05 s)", h.at(0.05)["j"][0], "m", 1e-9), ("value(a, side.force, at: 0 s)", -4e3 * 3e-3, "N", 1e-9),
    ("value(a, oil.force, at: 0.02 s)", 150 * h.at(0.02)["j"][1], "N", 1e-8), ("value(b, j.displacement, at: 0.6 s)", h2.at(0.6)["j"][0], "m", 1e-9),
    ("value(b, oil.force, at: 0.6 s)", 150 * (h2.at(0.6)["j"][1] - base(0.6)[1]), "N", 1e-8), ("peak(b, oil.force)", h2.peak(lambda m: 150 * (m["j"][1] - m["floor"][1])), "N", 1e-7),
])

s = System("motor wheel load").mass("motor", 0.3).mass("wheel", 2.0).mass("load", 40).bind("load", wheel=0.2).spring("motor", "wheel", 800).damper("motor", "wheel", 1.5).damper("load", "ground", 60)
h = History(s, 1.5, {"motor": lambda t: 12.0}, x0={"motor": 0.1}, v0={"motor": 5.0})
m = h.at(1.1)
model("turning-with-a-bind", IVP, """
inertia motor = 0.3 kg*m^2
    starts_at = 0.1 rad
    starts_moving = 5 rad/s
inertia wheel = 2 kg*m^2
mass load = 40 kg
let radius = 0.2 m
bind load = radius * wheel
spring shaft between motor and wheel = 800 N*m/rad
damper oil between motor and wheel = 1.5 N*m*s/rad
damper rope between load and ground = 60 N*s/m
torque drive on motor
    step = 12 N*m
ask history h
    of = motor.speed
    lasting = 1.5 s
""", [
    ("value(h, motor.speed, at: 1.1 s)", m["motor"][1] / TAU, "Hz", 1e-9), ("value(h, load.velocity, at: 1.1 s)", m["load"][1], "m/s", 1e-9), ("value(h, motor.angle, at: 1.1 s)", m["motor"][0], "", 1e-9),
    ("value(h, motor.angular_acceleration, at: 0.01 s)", h.at(0.01)["motor"][2], "1/s^2", 1e-8), ("peak(h, shaft.torque)", h.peak(lambda m: 800 * (m["motor"][0] - m["wheel"][0])), "N*m", 1e-8),
    ("peak(h, motor.speed)", h.peak(lambda m: m["motor"][1]) / TAU, "Hz", 1e-8), ("value(h, oil.power, at: 0.2 s)", 1.5 * (h.at(0.2)["motor"][1] - h.at(0.2)["wheel"][1]) ** 2, "W", 1e-8),
    ("value(h, shaft.rate, at: 0.2 s)", (h.at(0.2)["motor"][1] - h.at(0.2)["wheel"][1]) / TAU, "Hz", 1e-8), ("rms(h, motor.speed)", h.rms(lambda m: m["motor"][1]) / TAU, "Hz", 1e-7),
])

names = [f"m{i}" for i in range(12)]
s = System(" ".join(names))
text = []
for i, n in enumerate(names):
    mm, kk, cc = 1 + 0.3 * ((i * 7) % 5), 2e3 * (1 + (i * 3) % 4), 2 + (i * 5) % 3
    s.mass(n, mm)
    before = names[i - 1] if i else "ground"
    s.spring(n, before, kk).damper(n, before, cc)
    text += [f"mass {n} = {mm:.1f} kg", f"spring k{i} between {n} and {before} = {kk:.0f} N/m", f"damper c{i} between {n} and {before} = {cc} N*s/m"]
s.spring("m11", "m3", 700.0)
text.append("spring back between m11 and m3 = 700 N/m")
h = History(s, 3.0, {"m11": lambda t: 30 * math.sin(math.pi * t / 0.2) if t < 0.2 else 0.0}, breaks=[0.2])
f = s.frequencies()
z = s.roots()
x = s.steady(4, {"m5": 1})
up = h.upward(lambda m: m["m11"][0])
model("twelve-masses", "SciPy: eigh, eig; " + IVP, "\n".join(text) + """
force hit on m11
    pulse = half_sine
    peak = 30 N
    duration = 0.2 s
force f on m5
    amplitude = 1 N
    frequency = 4 Hz
ask history h
    of = m11.displacement
    by = hit
    lasting = 3 s
ask sweep s
    of = m0.displacement
    by = f
    from = 0.5 Hz
    to = 40 Hz
""", [(f"natural_frequency({i + 1})", q, "Hz", 1e-10) for i, q in enumerate(f)]
    + [("stability_margin()", min(-q.real for q in z), "1/s"), ("value(h, m11.displacement, at: 2.2 s)", h.at(2.2)["m11"][0], "m", 1e-8), ("peak(h, k0.force)", h.peak(lambda m: m["m0"][0] * 2e3), "N", 1e-7),
       ("value(s, m0.displacement, at: 4 Hz)", abs(x["m0"]), "m"), ("phase(s, m0.displacement, at: 4 Hz)", np.angle(x["m0"]), ""),
       ("period_of(h, m11.displacement)", (up[-1] - up[0]) / (len(up) - 1), "s", 1e-8), ("damping_ratio(12)", (lambda q: -q.real / abs(q))(z[-1]), "", 1e-9)])
