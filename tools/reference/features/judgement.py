"""Cases, tolerances, margins, separations, files that are used, and what cannot be computed."""

import math

import numpy as np
from scipy.stats import norm

from features.book import model
from features.mechanics import TAU, System, peak_of

model("separation-and-clear-of-modes", "modes by SciPy: eigh; distances by hand; an antisymmetric mode is not excited in the middle", """
mass a = 4 kg
mass b = 7 kg
mass c = 4 kg
spring ag between a and ground = 6 N/mm
spring cg between c and ground = 6 N/mm
spring ab between a and b = 9 N/mm
spring bc between b and c = 9 N/mm
damper oil between b and ground = 9 N*s/m
force f on b
    amplitude = 1 N
    speed = 300 rpm to 420 rpm
force g on a
    amplitude = 1 N
    speed = 900 rpm
ask modes
""", (lambda f: [
    ("separation(2, 600 rpm)", abs(10 / f[1] - 1), ""), ("clear_of_modes(300 rpm to 420 rpm)", min(min(abs(r / x - 1) for r in (5, 7)) if not 5 <= x <= 7 else 0 for x in (f[0], f[2])), ""),
    ("clear_of_modes(300 rpm to 420 rpm, orders: (1, 2, 4))", min(0 if o * 5 <= x <= o * 7 else min(abs(o * r / x - 1) for r in (5, 7)) for x in (f[0], f[2]) for o in (1, 2, 4)), ""),
    ("clear_of_modes(900 rpm)", min(abs(15 / x - 1) for x in f), ""), ("clear_of_modes(900 rpm, orders: (0.5, 1))", min(abs(o * 15 / x - 1) for x in f for o in (0.5, 1)), ""),
])(System("a b c").mass("a", 4).mass("b", 7).mass("c", 4).spring("a", "ground", 6e3).spring("c", "ground", 6e3).spring("a", "b", 9e3).spring("b", "c", 9e3).frequencies()))


def peak(m, k, c, lo=1, hi=30):
    return peak_of(lambda f: abs(1 / (k - m * (TAU * f) ** 2 + 1j * TAU * f * c)), lo, hi)[0]


def at(m, k, c, f):
    return abs(1 / (k - m * (TAU * f) ** 2 + 1j * TAU * f * c))


corners = [(10 * a, 5e3 * b, 40 * c) for a in (0.97, 1.03) for b in (0.9, 1.1) for c in (0.8, 1.2)]
inside = max(at(10 * a, k, 32.0, 3.5) for a in (0.97, 1, 1.03) for k in np.linspace(4500, 5500, 20001))
model("cases-and-worst-case", "corners by hand; inside the bands by a fine grid", """
let load = 10 kg +/- 3 %
let stiff = 5 kN/m +/- 10 %
let oil = 40 N*s/m +/- 20 %
mass m = load
spring k between m and ground = stiff
damper c between m and ground = oil
force f on m
    amplitude = 1 N
    frequency = 3.5 Hz
ask sweep s
    of = m.displacement
    from = 1 Hz
    to = 30 Hz
case heavy
    load = 14 kg
case soft_and_dry
    stiff = 3 kN/m
    oil = 25 N*s/m +/- 10 N*s/m
expect low = natural_frequency(1) <= 9 Hz
    tolerance = worst_case
expect high = natural_frequency(1) >= 1 Hz
    tolerance = worst_case
expect tall = peak(s, m.displacement) <= 10 m
    tolerance = worst_case
expect inner = value(s, m.displacement, at: 3.5 Hz) <= 10 m
    tolerance = worst_case
expect band = 2 Hz <= natural_frequency(1) <= 3.1 Hz
    cases = heavy
expect thin = natural_frequency(1) <= 3.6 Hz
    margin = 10 %
""", [], modes=[
    ("expectations.[0].value", math.sqrt(500) / TAU), ("expectations.[0].tolerance.worst", math.sqrt(5500 / 9.7) / TAU),
    ("expectations.[1].tolerance.worst", math.sqrt(4500 / 10.3) / TAU), ("expectations.[2].tolerance.worst", max(peak(*c) for c in corners), 1e-8),
    ("expectations.[3].tolerance.worst", inside, 1e-6), ("expectations.[0].tolerance.holds", True),
    ("expectations.[4].name", "thin"), ("expectations.[4].margin", 1 - math.sqrt(500) / TAU / 3.6, 1e-9),
    ("/[1].name", "heavy"), ("/[1].parameters.load.low", 14 * 0.97), ("/[1].expectations.[0].tolerance.worst", math.sqrt(5500 / (14 * 0.97)) / TAU),
    ("/[1].expectations.[4].name", "band.low"), ("/[1].expectations.[5].value", math.sqrt(5000 / 14) / TAU), ("/[1].expectations.[5].limit", 3.1),
    ("/[2].parameters.oil.high", 35), ("/[2].parameters.oil.low", 15), ("/[2].parameters.stiff.high", 3300),
    ("/[2].expectations.[2].tolerance.worst", max(peak(10 * a, 3e3 * b, c) for a in (0.97, 1.03) for b in (0.9, 1.1) for c in (15, 35)), 1e-8),
    ("/[2].modes.[0].frequencyHz", math.sqrt(300) / TAU),
])

model("absolute-band-dropped-by-a-case", "worst corner by hand", """
let load = 10 kg +/- 1 kg
mass m = load
spring k between m and ground = 5 kN/m
case heavy
    load = 20 kg
expect low = natural_frequency(1) <= 5 Hz
    tolerance = worst_case
""", [], modes=[("expectations.[0].tolerance.worst", math.sqrt(5000 / 9) / TAU), ("/[1].parameters.load.low", "absent")])

model("count-with-tolerances", "four independent draws of one element, a let drawn once; by hand", """
let shared = 2 kN/m +/- 5 %
mass m = 10 kg
spring four between m and ground = 1 kN/m +/- 10 %
    count = 4
spring two between m and ground = shared
    count = 2
damper c between m and ground = 5 N*s/m +/- 20 %
    count = 3
expect high = natural_frequency(1) <= 9 Hz
    tolerance = worst_case
expect damped = damping_ratio(1) >= 1 %
    tolerance = worst_case
""", [("natural_frequency(1)", math.sqrt(800) / TAU, "Hz")], modes=[
    ("expectations.[0].tolerance.worst", math.sqrt((4400 + 4200) / 10) / TAU),
    ("expectations.[1].tolerance.worst", 12 / (2 * math.sqrt(10 * (4400 + 4200)))),
])

# k uniform in 4500..5500: f <= L holds with share (10 (2 pi L)^2 - 4500) / 1000
L = 3.6
share = (10 * (TAU * L) ** 2 - 4500) / 1000
sigma = 5e3 * 0.1 / 3
model("share-of-draws", "closed form of a uniform and a normal band; the share of seeded draws within four standard errors", """
let stiff = 5 kN/m +/- 10 %
mass m = 10 kg
spring k between m and ground = stiff
expect uniform_share = natural_frequency(1) <= 3.6 Hz
    tolerance = 99 %
""", [], modes=[("expectations.[0].tolerance.share", share, None, 0.05), ("expectations.[0].tolerance.holds", False)])

model("share-of-normal-draws", "scipy.stats.norm: the band is three standard deviations", """
let stiff = 5 kN/m +/- 10 % normal
mass m = 10 kg
spring k between m and ground = stiff
expect share = natural_frequency(1) <= 3.6 Hz
    tolerance = 90 %
""", [], modes=[("expectations.[0].tolerance.share", norm.cdf((10 * (TAU * 3.6) ** 2 - 5000) / sigma), None, 0.02)])

model("uses-another-file", "limits and lets of the other file put in by hand", """
use "shared-numbers.thrum"
mass m = plant_mass
spring k between m and ground = pad
    count = pads
damper c between m and ground = 40 N*s/m
force f on m
    unbalance = 0.01 kg*m
    speed = run_speed
ask sweep s
    of = m.velocity
    from = 1 Hz
    to = 30 Hz
""", [
    ("natural_frequency(1)", math.sqrt(4 * 2e3 / 25) / TAU, "Hz"),
    ("value(s, m.velocity, at: run_speed)", TAU * 12 * 0.01 * (TAU * 12) ** 2 * at(25, 8e3, 40, 12), "m/s"),
    ("below(s, m.velocity, house)", peak_of(lambda f: TAU * f * 0.01 * (TAU * f) ** 2 * at(25, 8e3, 40, f), 1, 30)[0] / 0.05, "", 1e-8),
], files={"shared-numbers.thrum": "thrum 1\nlet plant_mass = 25 kg +/- 2 %\nlet pad = 2 kN/m\nlet pads = 4\nlet run_speed = 720 rpm\nlimit house = 50 mm/s\n"})

model("not-computed", "null with a reason", """
mass m = 10 kg
spring k between m and ground = 5 kN/m
damper c between m and ground = 40 N*s/m
force f on m
    amplitude = 1 N
    frequency = 3.5 Hz
force g on m
    amplitude = 1 N
    frequency = 3.5 Hz
ask sweep s
    of = m.displacement
    by = f, g
    from = 1 Hz
    to = 30 Hz
ask history h
    of = m.displacement
    by = f
    lasting = 1 s
""", [
    ("natural_frequency(2)", None, "Hz"), ("transmissibility(s, k, at: 3 Hz)", None, ""), ("value(h, m.displacement, at: 2 s)", None, "m"),
], codes=["expectation-fails"])
