"""Units in all spellings, rates, helpers of numbers."""

import math

from features.book import model
from features.mechanics import FOOT, GN, INCH, LBF, LBM, TAU

model("units-spelled", "exact definitions, NIST SP 811 and ISO 80000-3", """
mass m = 1 kg
spring k between m and ground = 1 N/m
""", [
    ("1 in", INCH, "m"), ("1 mil", 1e-3 * INCH, "m"), ("1 ft", FOOT, "m"), ("2.5 um + 1 µm", 3.5e-6, "m"),
    ("1 lbf", LBF, "N"), ("1 kip", 1e3 * LBF, "N"), ("1 lbm", LBM, "kg"), ("1 oz", LBM / 16, "kg"),
    ("1 slug", LBF / FOOT, "kg"), ("1 psi", LBF / INCH**2, "Pa"), ("1 lbf*s^2/in", LBF / INCH, "kg"),
    ("1 lbf*s^2/ft", LBF / FOOT, "kg"), ("3 t + 2 Mg", 5000, "kg"), ("1 gn", GN, "m/s^2"), ("90 deg", math.pi / 2, ""),
    ("3 % + 5 ppm", 0.030005, ""), ("60 cpm", 1, "Hz"), ("90 rpm", 1.5, "Hz"), ("2 rev/s", 2, "Hz"),
    ("2 rad/s", 2 / TAU, "Hz"), ("720 deg/s", 2, "Hz"), ("1 min + 1 h", 3660, "s"), ("1 kN*m/rad", 1000, "N*m"),
    ("1 N*m/rpm", 60 / TAU, "N*m*s"), ("1 N*m*s/deg", 180 / math.pi, "N*m*s"), ("1 lbf*in*s/rad", LBF * INCH, "N*m*s"),
    ("7 GPa*mm^4", 7e-3, "N*m^2"), ("2 N·s/m", 2, "N*s/m"), ("5 N*m/(rad/s)", 5, "N*m*s"), ("1 kJ + 1 W*s", 1001, "J"),
    ("1 lbf/in", LBF / INCH, "N/m"), ("1 lbf*s/in", LBF / INCH, "N*s/m"), ("1 lbm*ft^2", LBM * FOOT**2, "kg*m^2"),
    ("3 m/s / (2 m/s^2)", 1.5, "s"), ("4 1/s", 4, "1/s"),
])

model("units-inch-model", "f = sqrt(k/m)/2pi and its damped root, closed form", """
let k = 40 lbf/in
mass block = 96.5 lbm
    weight = positive
spring coil between block and ground = k
    count = 2
damper oil between block and ground = 1.5 lbf*s/in
""", [
    ("natural_frequency(1)", math.sqrt(80 * LBF / INCH / (96.5 * LBM)) / TAU, "Hz"),
    ("damping_ratio(1)", 1.5 * LBF / INCH / (2 * math.sqrt(80 * LBF / INCH * 96.5 * LBM)), ""),
    ("static_deflection(coil)", 96.5 * LBM * GN / (80 * LBF / INCH), "mil"),
    ("static_force(coil)", 96.5 * LBF, "lbf"),
    ("stiffness_for(600 cpm, 10 lbm)", (TAU * 10) ** 2 * 10 * LBM, "lbf/in"),
    ("critical_damping(k, 96.5 lbm)", 2 * math.sqrt(40 * LBF / INCH * 96.5 * LBM), "lbf*s/in"),
])

model("rates-mixed", "one cycle is 2 pi, by hand", """
let f = 12 Hz
let n = 720 rpm
let w = 75.398223686155035 rad/s
mass m = 10 kg
spring k between m and ground = 10 kg * (2*pi*f)^2
spring k2 between m and ground = 1e-9 * 10 kg * (n as rad/s)^2
""", [
    ("f / n", 1, ""), ("w / f", 1, "", 1e-14), ("3 / f", 0.25, "s"), ("f + n - w", 12, "Hz"), ("max(f, 900 rpm)", 15, "Hz"),
    ("natural_frequency(1)", 12 * math.sqrt(1 + 1e-9), "Hz", 1e-13), ("2 * pi * n", TAU * 12, "1/s"),
    ("sin(2*pi*f * (1 s / 48))", 1, ""), ("if(n > 11.9 Hz, 1, 2)", 1, ""), ("0.5 m * (f as rad/s)^2", 0.5 * (TAU * 12) ** 2, "m/s^2"),
    ("(30 1/s) as rad/s", 30 / TAU, "Hz"), ("sqrt((10 kN/m) / (10 kg)) as rad/s", math.sqrt(1000) / TAU, "Hz"),
    ("abs(f - 2 * n)", 12, "Hz"), ("-2^2 + 2^3^2", 508, ""), ("atan2(1, -1)", 3 * math.pi / 4, ""),
    ("round(2.4) + floor(-2.5) + ceil(2.1) + sign(-3)", 2 - 3 + 3 - 1, ""), ("log10(1000) + ln(e^2)", 5, ""),
])

w1, w2 = TAU * 5, TAU * 20
beta = 2 * (0.03 * w2 - 0.02 * w1) / (w2**2 - w1**2)
k_in = math.pi * (80e-3) ** 4 / 32 * 79e9 / 0.5
model("helpers", "handbook formulas evaluated in Python", """
let G = 79 GPa
let E = 206 GPa
let I = 4.2e-7 m^4
mass m = 1 kg
spring k between m and ground = 1 N/m
""", [
    ("helical_spring(8 mm, 60 mm, 6, G)", 79e9 * 8e-3**4 / (8 * 60e-3**3 * 6), "N/m"),
    ("cantilever(E, I, 0.8 m)", 3 * 206e9 * 4.2e-7 / 0.8**3, "N/m"),
    ("simply_supported(E, I, 0.8 m)", 48 * 206e9 * 4.2e-7 / 0.8**3, "N/m"),
    ("fixed_fixed(E, I, 0.8 m)", 192 * 206e9 * 4.2e-7 / 0.8**3, "N/m"),
    ("shaft(G, 80 mm, 0.5 m)", k_in, "N*m"),
    ("shaft(G, 80 mm, 0.5 m, bore: 40 mm)", k_in * (1 - 0.5**4), "N*m"),
    ("disc(20 kg, 0.3 m)", 0.9, "kg*m^2"), ("rod(12 kg, 2 m)", 4, "kg*m^2"), ("ring(8 kg, 0.2 m, 0.3 m)", 0.52, "kg*m^2"),
    ("series(2 N/m, 3 N/m, 6 N/m)", 1, "N/m"), ("parallel(2 N/m, 3 N/m, 6 N/m)", 11, "N/m"),
    ("gas_spring(500 kPa, 0.02 m^2, 3e-3 m^3, 1.3)", 1.3 * 5e5 * 4e-4 / 3e-3, "N/m"),
    ("decay_ratio(10 mm, 4 mm, 3)", (lambda d: d / math.sqrt(4 * math.pi**2 + d * d))(math.log(2.5) / 3), ""),
    ("mass_damping_for(2 %, 5 Hz, 3 %, 20 Hz)", 2 * 0.02 * w1 - beta * w1 * w1, "1/s"),
    ("stiffness_damping_for(2 %, 5 Hz, 3 %, 20 Hz)", beta, "s"),
])

model("tuple-and-tolerance-forms", "written bands put in by hand; corners of f = sqrt(k/m)/2pi", """
let m0 = 10 kg ± 0.5 kg
let k0 = 4 kN/m +/- 10 % lognormal
mass m = m0
spring k between m and ground = k0
""", [
    ("natural_frequency(1)", math.sqrt(400) / TAU, "Hz"),
], modes=[
    ("parameters.m0.low", 9.5), ("parameters.m0.high", 10.5),
    ("parameters.k0.low", 4000 / 1.1), ("parameters.k0.high", 4400),
])
