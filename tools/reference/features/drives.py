"""What drives in time: pulses, steps, impulses, chirps, laws, records; motions in all three derivatives."""

import math

import numpy as np
from scipy.integrate import quad

from features.book import model
from features.mechanics import GN, TAU, History, System

IVP = "SciPy: solve_ivp DOP853 at 3e-13 between the breaks"
ONE = """
mass m = 3 kg
spring k between m and %s = 2 kN/m
damper c between m and %s = 11 N*s/m
"""
K, C, M = 2e3, 11.0, 3.0


def one(given=None):
    s = System("m", given).mass("m", M)
    far = given or "ground"
    return s.spring("m", far, K).damper("m", far, C)


def shape(kind, peak, T, rise=0.0, fall=0.0, start=0.0):
    """The seven pulses by their definitions; breaks beside the function."""
    def f(t):
        u = t - start
        if u < 0 or u > T:
            return 0.0
        return peak * {
            "half_sine": lambda: math.sin(math.pi * u / T),
            "haversine": lambda: 0.5 * (1 - math.cos(TAU * u / T)),
            "triangle": lambda: 1 - abs(2 * u / T - 1),
            "rectangle": lambda: 1.0,
            "rising_sawtooth": lambda: u / T,
            "falling_sawtooth": lambda: 1 - u / T,
            "trapezoid": lambda: min(u / rise if rise else 1.0, 1.0, (T - u) / fall if fall else 1.0),
        }[kind]()
    return f, [start, start + rise, start + T / 2, start + T - fall, start + T]


for kind, more in (("half_sine", ""), ("haversine", ""), ("triangle", ""), ("rectangle", ""), ("rising_sawtooth", ""),
                   ("falling_sawtooth", ""), ("trapezoid", "\n    rise = 12 ms\n    fall = 30 ms")):
    rise, fall = (0.012, 0.030) if more else (0, 0)
    f, breaks = shape(kind, 60.0, 0.08, rise, fall, 0.05)
    h = History(one(), 0.6, {"m": f}, breaks=breaks)
    g, breaks2 = shape(kind, 4.0, 0.08, rise, fall, 0.0)
    # a support accelerated so: its velocity and displacement by quadrature, the relative motion by solve_ivp
    rel = History(one(), 0.4, {"m": lambda t, g=g: -M * g(t)}, breaks=breaks2)
    high, when = h.extreme(lambda m: m["m"][0])
    cuts = sorted({b for b in breaks2 if b > 0})
    moved = lambda t, g=g, cuts=cuts: sum(quad(lambda u: (t - u) * g(u), a, min(b, t), epsabs=1e-14, epsrel=1e-13)[0]
                                          for a, b in zip([0, *cuts], [*cuts, 1]) if a < t)
    relative = rel.extreme(lambda m: m["m"][0], -1)[0]
    model(f"pulse-{kind.replace('_', '-')}", IVP, (ONE % ("ground", "ground")) + f"""
support floor
mass n = 3 kg
spring kn between n and floor = 2 kN/m
damper cn between n and floor = 11 N*s/m
force f on m
    pulse = {kind}
    peak = 60 N
    duration = 80 ms
    start = 50 ms{more}
motion shake of floor
    pulse = {kind}
    peak = 4 m/s^2
    duration = 80 ms{more}
ask history h
    of = m.displacement
    by = f
    lasting = 0.6 s
ask history base
    of = kn.travel
    by = shake
    lasting = 0.4 s
""", [
        ("peak(h, m.displacement)", h.peak(lambda m: m["m"][0]), "m", 1e-8), ("peak_at(h, m.displacement)", when, "s", 1e-7),
        ("lowest(h, m.velocity)", h.extreme(lambda m: m["m"][1], -1)[0], "m/s", 1e-8),
        ("value(h, m.acceleration, at: 0.09 s)", h.at(0.09)["m"][2], "m/s^2", 1e-8),
        ("rms(h, m.displacement)", h.rms(lambda m: m["m"][0]), "m", 1e-7),
        ("lowest(base, kn.travel)", relative, "m", 1e-8),
        ("value(base, n.displacement, at: 0.3 s)", rel.at(0.3)["m"][0] + moved(0.3), "m", 1e-8),
        ("value(base, floor.displacement, at: 0.3 s)", moved(0.3), "m", 1e-9),
        ("value(base, n.acceleration, at: 0.21 s)", rel.at(0.21)["m"][2], "m/s^2", 1e-8),
    ])

p, w = C / (2 * M), math.sqrt(K / M - (C / (2 * M)) ** 2)
step = lambda t: 0.0 if t < 0 else 1 / K * (1 - math.exp(-p * t) * (math.cos(w * t) + p / w * math.sin(w * t)))
imp = lambda t: 0.0 if t < 0 else math.exp(-p * t) * math.sin(w * t) / (M * w)
h = History(one(), 1.0, {"m": lambda t: 40 * min(max((t - 0.1) / 0.2, 0), 1)}, breaks=[0.1, 0.3])
model("steps-and-impulses", "step and impulse response of an oscillator, closed form; " + IVP, (ONE % ("ground", "ground")) + """
force jump on m
    step = 40 N
    start = 0.1 s
force ramp on m
    step = 40 N
    start = 0.1 s
    rise = 0.2 s
force blow on m
    impulse = 0.5 N*s
    start = 0.05 s
force back on m
    impulse = -0.2 N*s
ask history a
    of = m.displacement
    by = jump
    lasting = 8 s
ask history b
    of = m.displacement
    by = ramp
    lasting = 1 s
ask history c2
    of = m.displacement
    by = blow, back, jump
    lasting = 0.4 s
ask history alone
    of = m.velocity
    by = blow
    lasting = 0.2 s
""", [
    ("value(a, m.displacement, at: 0.4 s)", 40 * step(0.3), "m", 1e-10), ("highest(a, m.displacement)", 40 / K * (1 + math.exp(-p * math.pi / w)), "m", 1e-9),
    ("peak_at(a, m.displacement)", 0.1 + math.pi / w, "s", 1e-8), ("value(b, m.displacement, at: 0.9 s)", h.at(0.9)["m"][0], "m", 1e-9),
    ("peak(b, m.displacement)", h.peak(lambda m: m["m"][0]), "m", 1e-8),
    ("value(c2, m.displacement, at: 0.4 s)", 40 * step(0.3) + 0.5 * imp(0.35) - 0.2 * imp(0.4), "m", 1e-9),
    ("value(alone, m.velocity, at: 0.05 s)", 0.5 / 3, "m/s", 1e-9), ("highest(alone, m.velocity)", 0.5 / 3, "m/s", 1e-9),
    ("period_of(a, m.displacement)", TAU / w, "s", 1e-8), ("value(c2, m.velocity, at: 0 s)", -0.2 / 3, "m/s", 1e-9),
    ("settling_time(a, m.displacement, 0.5 mm)", History(one(), 8.0, {"m": lambda t: 40 if t > 0.1 else 0}, breaks=[0.1]).last_outside(lambda m: m["m"][0], 0.02, 0.5e-3), "s", 1e-8),
    ("settling_time(a, m.displacement, 10 %)", History(one(), 8.0, {"m": lambda t: 40 if t > 0.1 else 0}, breaks=[0.1]).last_outside(lambda m: m["m"][0], 0.02, 2e-3), "s", 1e-8),
])

rate = lambda t: 2 + (12 - 2) * t / 3
turn = lambda t: TAU * (2 * t + (12 - 2) * t * t / 6)
h1 = History(one(), 3.5, {"m": lambda t: 10 * math.cos(turn(t)) if t < 3 else 0}, breaks=[3])
h2 = History(one(), 3.5, {"m": lambda t: 0.004 * (TAU * rate(t)) ** 2 * math.cos(turn(t)) if t < 3 else 0}, breaks=[3])
model("chirps", IVP + "; phase is the integral of the rate", (ONE % ("ground", "ground")) + """
force sweep_up on m
    chirp = from 2 Hz to 12 Hz
    amplitude = 10 N
    lasting = 3 s
force run_up on m
    chirp = from 120 rpm to 720 rpm
    unbalance = 4e-3 kg*m
    lasting = 3 s
ask history a
    of = m.displacement
    by = sweep_up
    lasting = 3 s
ask history b
    of = m.displacement
    by = run_up
    lasting = 3 s
""", [
    ("peak(a, m.displacement)", History(one(), 3.0, {"m": lambda t: 10 * math.cos(turn(t))}).peak(lambda m: m["m"][0], 4000), "m", 1e-7),
    ("value(a, m.displacement, at: 2.7 s)", h1.at(2.7)["m"][0], "m", 1e-7),
    ("peak(b, m.displacement)", History(one(), 3.0, {"m": h2.forces["m"]}).peak(lambda m: m["m"][0], 4000), "m", 1e-7),
    ("value(b, m.acceleration, at: 1.3 s)", h2.at(1.3)["m"][2], "m/s^2", 1e-7),
])

law1 = lambda t: 20 * abs(math.sin(TAU * 1.5 * t)) + (15 if t > 0.37 else -5)
law2 = lambda t: 8 * math.floor(t / 0.13) * math.exp(-t / 0.4) + 3 * min(t / 0.2, 1)
k1 = [i / 3 for i in range(1, 6)] + [0.37]
k2 = [0.13 * i for i in range(1, 9)] + [0.2]
h1 = History(one(), 1.0, {"m": law1}, breaks=k1)
h2 = History(one(), 1.0, {"m": law2}, breaks=k2)
model("laws-with-kinks", IVP, (ONE % ("ground", "ground")) + """
let f = 1.5 Hz
force a on m
    law = 20 N * abs(sin(2*pi*f * t)) + if(t > 0.37 s, 15 N, -5 N)
force b on m
    law = 8 N * floor(t / 0.13 s) * exp(-t / 0.4 s) + 3 N * min(t / 0.2 s, 1)
ask history ha
    of = m.displacement
    by = a
    lasting = 1 s
ask history hb
    of = m.displacement
    by = b
    lasting = 1 s
""", [
    ("value(ha, m.displacement, at: 0.8 s)", h1.at(0.8)["m"][0], "m", 1e-7), ("peak(ha, m.displacement)", h1.peak(lambda m: m["m"][0]), "m", 1e-7),
    ("value(hb, m.velocity, at: 0.77 s)", h2.at(0.77)["m"][1], "m/s", 1e-7), ("peak(hb, m.displacement)", h2.peak(lambda m: m["m"][0]), "m", 1e-7),
    ("rms(hb, m.acceleration)", h2.rms(lambda m: m["m"][2]), "m/s^2", 1e-6),
])

w1, w2, w3 = TAU * 3, TAU * 4, TAU * 5
fd = lambda t: (2e-3 * math.sin(w1 * t), 2e-3 * w1 * math.cos(w1 * t), -2e-3 * w1**2 * math.sin(w1 * t))
fv = lambda t: (0.05 * (math.sin(w2 * t + 0.5) - math.sin(0.5)) / w2, 0.05 * math.cos(w2 * t + 0.5), -0.05 * w2 * math.sin(w2 * t + 0.5))
ph = -math.pi / 6
fa = lambda t: (-3 / w3**2 * (math.cos(w3 * t + ph) - math.cos(ph)) - 3 / w3 * math.sin(ph) * t, 3 / w3 * (math.sin(w3 * t + ph) - math.sin(ph)), 3 * math.cos(w3 * t + ph))
hd, hv, ha = (History(one("floor"), 1.2, supports={"floor": f}) for f in (fd, fv, fa))
st = lambda amplitude, f: one("floor").steady(f, supports={"floor": amplitude})
xd, xv, xa = st(2e-3 * -1j, 3), st(0.05 / (1j * w2) * np.exp(0.5j), 4), st(-3 / w3**2 * np.exp(1j * ph), 5)
model("motions-sine", IVP + "; steady: NumPy solve", "support floor" + (ONE % ("floor", "floor")) + """
motion by_travel of floor
    amplitude = 2 mm
    frequency = 3 Hz
    phase = -90 deg
motion by_speed of floor
    amplitude = 50 mm/s
    frequency = 4 Hz
    phase = 0.5 rad
motion by_acceleration of floor
    amplitude = 3 m/s^2
    frequency = 5 Hz
    phase = -30 deg
ask history d
    of = m.displacement
    by = by_travel
    lasting = 1.2 s
ask history v
    of = m.displacement
    by = by_speed
    lasting = 1.2 s
ask history a
    of = m.displacement
    by = by_acceleration
    lasting = 1.2 s
ask sweep sd
    of = m.displacement
    by = by_travel
    from = 1 Hz
    to = 20 Hz
ask sweep sv
    of = m.displacement
    by = by_speed
    from = 1 Hz
    to = 20 Hz
ask sweep sa
    of = m.displacement
    by = by_acceleration
    from = 1 Hz
    to = 20 Hz
""", [
    ("value(d, m.displacement, at: 1.1 s)", hd.at(1.1)["m"][0], "m", 1e-8), ("value(d, k.force, at: 1.1 s)", K * (hd.at(1.1)["m"][0] - hd.at(1.1)["floor"][0]), "N", 1e-8),
    ("value(v, m.displacement, at: 1.1 s)", hv.at(1.1)["m"][0], "m", 1e-8), ("value(v, floor.displacement, at: 0.7 s)", fv(0.7)[0], "m", 1e-10),
    ("value(a, m.displacement, at: 1.1 s)", ha.at(1.1)["m"][0], "m", 1e-8), ("value(a, m.acceleration, at: 0.6 s)", ha.at(0.6)["m"][2], "m/s^2", 1e-8),
    ("value(a, c.force, at: 0.6 s)", C * (ha.at(0.6)["m"][1] - fa(0.6)[1]), "N", 1e-8), ("peak(d, m.velocity)", hd.peak(lambda m: m["m"][1]), "m/s", 1e-8),
    ("value(sd, m.displacement, at: 3 Hz)", abs(xd["m"]), "m"), ("phase(sd, m.displacement, at: 3 Hz)", np.angle(xd["m"]), ""),
    ("value(sv, m.displacement, at: 4 Hz)", abs(xv["m"]), "m"), ("phase(sv, k.force, at: 4 Hz)", np.angle(xv["m"] - xv["floor"]), ""),
    ("value(sa, m.displacement, at: 5 Hz)", abs(xa["m"]), "m"), ("phase(sa, m.displacement, at: 5 Hz)", np.angle(xa["m"]), ""),
    ("transmissibility(sa, m.acceleration, at: 5 Hz)", abs(xa["m"] / xa["floor"]), ""), ("transmissibility(sa, m.displacement, at: 5 Hz)", abs(xa["m"] / xa["floor"]), ""),
    ("transmissibility(sv, m.acceleration, at: 4 Hz)", abs(xv["m"] / xv["floor"]), ""), ("transmissibility(sd, m.velocity, at: 3 Hz)", abs(xd["m"] / xd["floor"]), ""),
    ("transmissibility(sd, k, at: 3 Hz)", None, ""),
])

# steps of a support: in displacement, velocity and acceleration
step_d = lambda t: 5e-3 * (1 - math.exp(-p * t) * (math.cos(w * t) - p / w * math.sin(w * t)))
sd = History(one("floor"), 0.8, supports={"floor": lambda t: (0.02 * t, 0.02, 0.0)}, breaks=[])
sa = History(one("floor"), 0.8, supports={"floor": lambda t: (0.5 * t * t, t, 1.0) if t < 0.3 else (0.045 + 0.3 * (t - 0.3) + 0.5 * (t - 0.3) ** 2, 0.3 + (t - 0.3), 1.0)})
ramp = History(one("floor"), 0.8, supports={"floor": lambda t: (0.05 * min(t, 0.1), 0.05 if t < 0.1 else 0.0, 0.0)}, breaks=[0.1])
model("motions-step-and-jump", "step of a base under spring and damper, closed form; " + IVP, "support floor" + (ONE % ("floor", "floor")) + """
motion lift of floor
    step = 5 mm
motion lift_slowly of floor
    step = 5 mm
    rise = 0.1 s
motion walk of floor
    step = 20 mm/s
motion pull of floor
    step = 1 m/s^2
motion late of floor
    amplitude = 2 mm
    frequency = 3 Hz
ask history a
    of = m.displacement
    by = lift
    lasting = 0.8 s
ask history b
    of = m.displacement
    by = lift_slowly
    lasting = 0.8 s
ask history c2
    of = m.displacement
    by = walk
    lasting = 0.8 s
ask history d
    of = m.displacement
    by = pull
    lasting = 0.8 s
ask history e2
    of = m.displacement
    by = late
    lasting = 0.8 s
""", [
    ("value(a, m.displacement, at: 0.25 s)", step_d(0.25), "m", 1e-9), ("value(a, m.velocity, at: 0 s)", 5e-3 * C / M, "m/s", 1e-9),
    ("value(b, m.displacement, at: 0.5 s)", ramp.at(0.5)["m"][0], "m", 1e-8), ("value(b, c.force, at: 0.05 s)", C * (ramp.at(0.05)["m"][1] - 0.05), "N", 1e-8),
    ("value(c2, m.displacement, at: 0.5 s)", sd.at(0.5)["m"][0], "m", 1e-8), ("value(d, m.displacement, at: 0.5 s)", sa.at(0.5)["m"][0], "m", 1e-8),
    ("value(d, floor.velocity, at: 0.5 s)", 0.5, "m/s"),
    ("value(e2, m.displacement, at: 0.4 s)", (lambda hh: hh.at(0.4)["m"][0])(History(one("floor"), 0.8, supports={"floor": lambda t: (2e-3 * math.cos(w1 * t), -2e-3 * w1 * math.sin(w1 * t), -2e-3 * w1**2 * math.cos(w1 * t))}, v0={"m": 2e-3 * C / M})), "m", 1e-8),
    ("lowest(a, k.force)", -K * 5e-3, "N", 1e-9),
])

times = np.array([0.0, 0.05, 0.11, 0.2, 0.33, 0.5, 0.8])
values = np.array([0.0, 1.2, -0.7, 2.4, 0.3, -1.1, 0.0])
f_rec = lambda t: float(np.interp(t, times, values)) * 10 * 0.5 if t <= 0.8 else 0.0
hf = History(one(), 0.8, {"m": f_rec}, breaks=list(times[1:-1]))
sampled = np.array([0, 0.3, 0.1, -0.4, 0.2, 0.6, -0.2, 0.0, 0.1, 0.0]) * GN
ts = np.arange(10) / 25
acc = lambda t: float(np.interp(t, ts, sampled)) if t <= ts[-1] else 0.0
hr = History(one(), 0.36, {"m": lambda t: -M * acc(t)}, breaks=list(ts[1:-1]))
vel = np.array([0.0, 0.02, -0.01, 0.03, 0.0])
tv = np.array([0.0, 0.1, 0.2, 0.3, 0.4])
hv = History(one("floor"), 0.4, supports={"floor": lambda t: (quad(lambda u: np.interp(u, tv, vel), 0, t, points=[x for x in tv[1:-1] if x < t] or None, epsabs=1e-16, epsrel=1e-13)[0], float(np.interp(t, tv, vel)), float(np.diff(vel)[min(int(t / 0.1), 3)] / 0.1))}, breaks=[0.1, 0.2, 0.3])
model("records", IVP + "; linear between samples by numpy.interp", """
support floor""" + (ONE % ("ground", "ground")) + """
mass n = 3 kg
spring kn between n and floor = 2 kN/m
damper cn between n and floor = 11 N*s/m
force hit on m
    record = "records-comma.csv"
    column = "kraft"
    time_column = "zeit"
    unit = daN
    scale = 0.5
motion shake of floor
    record = "records-sampled.csv"
    column = 2
    sampled_at = 25 Hz
    unit = gn
motion move of floor
    record = "records-plain.csv"
    unit = m/s
ask history a
    of = m.displacement
    by = hit
    lasting = 0.8 s
ask history b
    of = kn.travel
    by = shake
    lasting = 0.36 s
ask history c2
    of = n.displacement
    by = move
    lasting = 0.4 s
""", [
    ("value(a, m.displacement, at: 0.6 s)", hf.at(0.6)["m"][0], "m", 1e-8), ("peak(a, m.displacement)", hf.peak(lambda m: m["m"][0]), "m", 1e-8),
    ("value(b, kn.travel, at: 0.3 s)", hr.at(0.3)["m"][0], "m", 1e-8), ("peak(b, kn.travel)", hr.peak(lambda m: m["m"][0]), "m", 1e-8),
    ("value(c2, n.displacement, at: 0.35 s)", hv.at(0.35)["m"][0], "m", 1e-8), ("value(c2, floor.displacement, at: 0.4 s)", 0.004, "m", 1e-9),
], files={
    "records-comma.csv": "\ufeff# gemessen am Kai\nzeit;leer;kraft\n" + "".join(f"{t:.2f};0;{v:.1f}\n".replace(".", ",") for t, v in zip(times, values)),
    "records-sampled.csv": "index,z\r\n" + "".join(f"{i},{v / GN:.1f}\r\n" for i, v in enumerate(sampled)),
    "records-plain.csv": "".join(f"{t:.1f}\t{v:.2f}\n" for t, v in zip(tv, vel)),
})
