"""What joins: counts, likes, groups, binds, junctions, inerters, springs with mass, signs."""

import math

import numpy as np

from features.book import model
from features.mechanics import GN, TAU, System

EIG = "SciPy: eigh(K, M) and eig of the state matrix"
SOLVE = "NumPy: solve (K + i w C - w^2 M) X = F"


def hz(system):
    return system.frequencies()


s = System("a b").mass("a", 12).mass("b", 30)
s.spring("a", "b", 4 * 8e3).damper("a", "b", 2 * 60).spring("b", "ground", 9e4).spring("b", "ground", 8e3).damper("b", "ground", 60 * 5)
x = s.steady(9, {"a": 7})
f_pads = (4 * 8e3) * (x["a"] - x["b"])
f_oil = 1j * TAU * 9 * 120 * (x["a"] - x["b"])
model("count-like-group", SOLVE, """
mass a = 12 kg
mass b = 30 kg
spring pads between a and b = 8 N/mm
    count = 4
    rated_travel = 40 mm
damper oil between a and b = 60 N*s/m
    count = 2
spring base between b and ground = 90 N/mm
> one of them only: its own count wins
spring side between b and ground
    like = pads
    count = 1
damper far between b and ground
    like = oil
    damping = 100 N*s/m
    count = 3
group feet = pads, oil
force f on a
    amplitude = 7 N
    frequency = 9 Hz
ask sweep s
    of = feet.force
    from = 1 Hz
    to = 40 Hz
""", [
    ("natural_frequency(1)", hz(s)[0], "Hz"), ("natural_frequency(2)", hz(s)[1], "Hz"),
    ("value(s, pads.force, at: 9 Hz)", abs(f_pads), "N"), ("value(s, feet.force, at: 9 Hz)", abs(f_pads + f_oil), "N"),
    ("value(s, feet, at: 9 Hz)", abs(f_pads + f_oil), "N"), ("phase(s, feet.force, at: 9 Hz)", np.angle(f_pads + f_oil), ""),
    ("transmissibility(s, feet, at: 9 Hz)", abs(f_pads + f_oil) / 7, ""), ("transmissibility(s, oil, at: 9 Hz)", abs(f_oil) / 7, ""),
    ("value(s, feet.travel, at: 9 Hz)", abs(x["a"] - x["b"]), "m"), ("value(s, feet.rate, at: 9 Hz)", TAU * 9 * abs(x["a"] - x["b"]), "m/s"),
    ("value(s, a.displacement - 0.5 * b.displacement, at: 9 Hz)", abs(x["a"] - 0.5 * x["b"]), "m"),
    ("value(s, ground.reaction, at: 9 Hz)", abs((98e3 + 1j * TAU * 9 * 300) * x["b"]), "N"),
    ("value(s, oil.power, at: 9 Hz)", 0.5 * 120 * (TAU * 9) ** 2 * abs(x["a"] - x["b"]) ** 2, "W"),
    ("value(s, pads.energy, at: 9 Hz)", 0.5 * 32e3 * abs(x["a"] - x["b"]) ** 2, "J"),
    ("value(s, b.acceleration, at: 9 Hz)", (TAU * 9) ** 2 * abs(x["b"]), "m/s^2"),
])

s = System("tip heel mid").mass("tip", 2).mass("heel", 5).mass("mid", 1.5).bind("tip", heel=-1.5).bind("mid", heel=-0.25)
s.spring("tip", "ground", 3e3).spring("heel", "ground", 5e3).damper("mid", "ground", 12)
z = s.roots()[0]
x = s.steady(3, {"tip": 4})
model("bind-lever-chained", EIG, """
let a = 0.4 m
let b = 0.6 m
mass tip = 2 kg
mass heel = 5 kg
mass mid = 1.5 kg
bind mid = 0.5 * tip + 0.5 * heel
bind tip = -(b/a) * heel
spring upper between tip and ground = 3 N/mm
spring lower between heel and ground = 5 N/mm
damper oil between mid and ground = 12 N*s/m
force f on tip
    amplitude = 4 N
    frequency = 3 Hz
ask sweep s
    of = tip.displacement
    from = 1 Hz
    to = 20 Hz
""", [
    ("natural_frequency(1)", hz(s)[0], "Hz"), ("damping_ratio(1)", -z.real / abs(z), ""), ("stability_margin()", -z.real, "1/s"),
    ("damped_frequency(1)", z.imag / TAU, "Hz"), ("value(s, mid.displacement, at: 3 Hz)", abs(x["mid"]), "m"),
    ("phase(s, heel.displacement, at: 3 Hz)", np.angle(x["heel"]), ""), ("value(s, upper.force, at: 3 Hz)", 3e3 * abs(x["tip"]), "N"),
    ("effective_mass(1)", (2 * -1.5 + 5 + 1.5 * -0.25) ** 2 / ((2 * 2.25 + 5 + 1.5 / 16) * 8.5), ""),
], modes=[("modes.[0].shape.tip.[0]", 1.0), ("modes.[0].shape.heel.[0]", -1 / 1.5), ("modes.[0].energyShare.lower", 5e3 / (5e3 + 3e3 * 2.25))])

s = System("motor pinion wheel drum load").mass("motor", 0.4).mass("pinion", 0.02).mass("wheel", 1.1).mass("drum", 2.0).mass("load", 150)
s.bind("pinion", wheel=-3.2).bind("load", drum=0.25)
s.spring("motor", "pinion", 5e3).spring("wheel", "drum", 4e4).damper("motor", "ground", 0.3).damper("load", "ground", 90)
f = hz(s)
r = s.roots()
model("bind-gear-drum", EIG + "; the free mode is 0, held by dampers only", """
inertia motor = 0.4 kg*m^2
inertia pinion = 0.02 kg*m^2
inertia wheel = 1.1 kg*m^2
inertia drum = 2 kg*m^2
mass load = 150 kg
let ratio = 3.2
let radius = 0.25 m
bind pinion = -ratio * wheel
bind load = radius * drum
spring shaft_a between motor and pinion = 5 kN*m/rad
spring shaft_b between wheel and drum = 40 kN*m/rad
damper air between motor and ground = 0.3 N*m*s/rad
damper guide between load and ground = 90 N*s/m
torque drive on motor
    amplitude = 8 N*m
    frequency = 10 Hz
ask sweep s
    of = shaft_b.torque
    from = 1 Hz
    to = 60 Hz
""", [
    ("natural_frequency(1)", f[1], "Hz"), ("natural_frequency(2)", f[2], "Hz"),
    ("value(s, shaft_b.torque, at: 10 Hz)", 4e4 * abs((lambda x: x["wheel"] - x["drum"])(s.steady(10, {"motor": 8}))), "N*m"),
    ("value(s, shaft_a.twist, at: 10 Hz)", abs((lambda x: x["motor"] - x["pinion"])(s.steady(10, {"motor": 8}))), ""),
    ("value(s, motor.speed, at: 10 Hz)", 10 * abs(s.steady(10, {"motor": 8})["motor"]), "Hz"),
    ("value(s, load.velocity, at: 10 Hz)", TAU * 10 * abs(s.steady(10, {"motor": 8})["load"]), "m/s"),
    ("value(s, motor.angular_acceleration, at: 10 Hz)", (TAU * 10) ** 2 * abs(s.steady(10, {"motor": 8})["motor"]), "1/s^2"),
])

# Zener, Maxwell and three in a row: the junction keeps its first-order equation.
s = System("m j").mass("m", 20).spring("m", "ground", 3e4).spring("m", "j", 5e4).damper("j", "ground", 400)
r = s.roots()
pair = [z for z in r if z.imag > 1e-6][0]
real = [z for z in r if z.imag <= 1e-6][0]
x = s.steady(7, {"m": 1})
model("junction-zener", EIG, """
mass m = 20 kg
junction j
spring main between m and ground = 30 kN/m
spring side between m and j = 50 kN/m
damper oil between j and ground = 400 N*s/m
force f on m
    amplitude = 1 N
    frequency = 7 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 20 Hz
""", [
    ("value(s, m.displacement, at: 7 Hz)", abs(x["m"]), "m"), ("value(s, side.force, at: 7 Hz)", abs(5e4 * (x["m"] - x["j"])), "N"),
    ("value(s, oil.force, at: 7 Hz)", abs(5e4 * (x["m"] - x["j"])), "N"), ("value(s, j.velocity, at: 7 Hz)", TAU * 7 * abs(x["j"]), "m/s"),
    ("natural_frequency(1)", math.sqrt(3e4 / 20) / TAU, "Hz"), ("damping_ratio(1)", -pair.real / abs(pair), ""),
    ("stability_margin()", min(-pair.real, -real.real), "1/s"),
], modes=[("modes.[0].eigenvalue.[0]", pair.real), ("modes.[0].eigenvalue.[1]", pair.imag), ("modes.[1].number", None),
          ("modes.[1].frequencyHz", None), ("modes.[1].eigenvalue.[0]", real.real), ("modes.[1].dampingRatio", None),
          ("modes.[1].reason", "this root has no undamped partner")])

s = System("m p q").mass("m", 8).spring("m", "p", 2e4).damper("p", "q", 900).spring("q", "ground", 6e4).spring("m", "ground", 1e3)
x = s.steady(5, {"m": 3})
r = s.roots()
pair = [z for z in r if z.imag > 1e-6][0]
model("junction-three-in-a-row", EIG + "; spring, damper, spring in series", """
mass m = 8 kg
junction p
junction q
spring one between m and p = 20 kN/m
damper two between p and q = 900 N*s/m
spring three between q and ground = 60 kN/m
spring weak between m and ground = 1 kN/m
force f on m
    amplitude = 3 N
    frequency = 5 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 20 Hz
""", [
    ("value(s, m.displacement, at: 5 Hz)", abs(x["m"]), "m"), ("value(s, p.displacement, at: 5 Hz)", abs(x["p"]), "m"),
    ("value(s, three.force, at: 5 Hz)", 6e4 * abs(x["q"]), "N"), ("phase(s, q.displacement, at: 5 Hz)", np.angle(x["q"]), ""),
    ("natural_frequency(1)", math.sqrt(1e3 / 8) / TAU, "Hz"),
], modes=[("modes.[0].eigenvalue.[0]", pair.real), ("modes.[0].eigenvalue.[1]", pair.imag)])

ks = 1 / (1 / 2e4 + 1 / 3e4 + 1 / 6e4)
model("junction-springs-in-series", "1/k = sum of 1/k, closed form", """
mass m = 8 kg
    weight = positive
junction p
junction q
spring one between m and p = 20 kN/m
spring two between p and q = 30 kN/m
    loss_factor = 0.2
spring three between q and ground = 60 kN/m
force f on m
    amplitude = 3 N
    frequency = 5 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 20 Hz
""", [
    ("natural_frequency(1)", math.sqrt(ks / 8) / TAU, "Hz"), ("static_deflection(two)", 8 * GN / 3e4, "m"),
    ("static_force(three)", 8 * GN, "N"), ("damping_ratio(1)", 0.5 * 0.2 * (1 / 3e4) / (1 / ks), "", 1e-8),
    ("value(s, m.displacement, at: 5 Hz)", abs(3 / (1 / (1 / 2e4 + 1 / (3e4 * (1 + 0.2j)) + 1 / 6e4) - 8 * (TAU * 5) ** 2)), "m"),
], modes=[("modes.[0].energyShare.one", (1 / 2e4) * ks), ("modes.[0].energyShare.two", (1 / 3e4) * ks)])

s = System("a b").mass("a", 6).mass("b", 15).spring("a", "b", 9e3, own=1.2).spring("b", "ground", 2e4, own=3.0).inerter("a", "b", 4).inerter("a", "ground", 2)
s.damper("a", "b", 40)
x = s.steady(4, {"a": 5})
w = TAU * 4
r = s.roots()
model("inerters-and-own-mass", EIG + "; consistent spring mass m/6 [2 1; 1 2]", """
mass a = 6 kg
mass b = 15 kg
spring upper between a and b = 9 kN/m
    mass = 1.2 kg
spring lower between b and ground = 20 kN/m
    mass = 3 kg
inerter screw between a and b = 4 kg
inerter flywheel between a and ground = 2 kg
damper oil between a and b = 40 N*s/m
force f on a
    amplitude = 5 N
    frequency = 4 Hz
ask sweep s
    of = a.displacement
    from = 1 Hz
    to = 20 Hz
""", [
    ("natural_frequency(1)", hz(s)[0], "Hz"), ("natural_frequency(2)", hz(s)[1], "Hz"),
    ("damping_ratio(1)", -r[0].real / abs(r[0]), ""), ("damping_ratio(2)", -r[1].real / abs(r[1]), ""),
    ("value(s, a.displacement, at: 4 Hz)", abs(x["a"]), "m"), ("value(s, screw.force, at: 4 Hz)", 4 * w * w * abs(x["a"] - x["b"]), "N"),
    ("value(s, screw.energy, at: 4 Hz)", 0.5 * 4 * w * w * abs(x["a"] - x["b"]) ** 2, "J"),
    ("value(s, upper.force, at: 4 Hz)", 9e3 * abs(x["a"] - x["b"]), "N"), ("value(s, screw.power, at: 4 Hz)", 0, "W", None, 1e-12),
])

s = System("a b").mass("a", 10).mass("b", 4).spring("a", "ground", 8e3).spring("a", "b", 3e3).spring("b", "ground", -900)
s.damper("a", "ground", 60).damper("a", "b", -8).damper("b", "ground", 15)
r = s.roots()
x = s.steady(4, {"b": 2})
model("negative-stiffness-and-damping", EIG, """
mass a = 10 kg
mass b = 4 kg
spring base between a and ground = 8 kN/m
spring link between a and b = 3 kN/m
spring toggle between b and ground = -0.9 kN/m
damper oil between a and ground = 60 N*s/m
damper active between a and b = -8 N*s/m
damper air between b and ground = 15 N*s/m
force f on b
    amplitude = 2 N
    frequency = 4 Hz
ask sweep s
    of = b.displacement
    from = 1 Hz
    to = 20 Hz
""", [
    ("natural_frequency(1)", hz(s)[0], "Hz"), ("natural_frequency(2)", hz(s)[1], "Hz"), ("stability_margin()", min(-z.real for z in r), "1/s"),
    ("damping_ratio(1)", -r[0].real / abs(r[0]), ""), ("value(s, b.displacement, at: 4 Hz)", abs(x["b"]), "m"),
    ("value(s, active.power, at: 4 Hz)", 0.5 * 8 * (TAU * 4) ** 2 * abs(x["a"] - x["b"]) ** 2, "W"),
])

s = System("m").mass("m", 10).spring("m", "ground", 1e3).damper("m", "ground", -2)
model("unstable-one-mass", "roots of m s^2 + c s + k, closed form", """
mass m = 10 kg
    starts_at = 1 mm
spring k between m and ground = 1 kN/m
damper c between m and ground = -2 N*s/m
force f on m
    amplitude = 2 N
    frequency = 4 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 20 Hz
force still on m
    step = 0 N
ask history h
    of = m.displacement
    by = still
    lasting = 3 s
""", [
    ("stability_margin()", -0.1, "1/s"), ("damping_ratio(1)", -2 / (2 * 100), ""),
    ("value(h, m.displacement, at: 2 s)", 1e-3 * math.exp(0.2) * (math.cos(math.sqrt(100 - 0.01) * 2) - 0.1 / math.sqrt(100 - 0.01) * math.sin(math.sqrt(100 - 0.01) * 2)), "m"),
    ("peak(s, m.displacement)", None, "m"), ("value(s, m.displacement, at: 4 Hz)", None, "m"),
], codes=["unstable-mode"])

model("buckling", "lambda = k/m < 0, closed form", """
mass m = 10 kg
spring k between m and ground = 1 kN/m
spring arch between m and ground = -1.5 kN/m
""", [
    ("natural_frequency(1)", None, "Hz"), ("separation(1, 4 Hz)", None, ""), ("damping_ratio(1)", None, ""),
    ("stability_margin()", -math.sqrt(50), "1/s"),
], modes=[("modes.[0].frequencyHz", 0), ("modes.[0].realRoots.[1]", math.sqrt(50)), ("modes.[0].realRoots.[0]", -math.sqrt(50))],
    codes=["static-instability", "expectation-fails"])
