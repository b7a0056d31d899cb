#!/usr/bin/env python3
"""Writes test/reference/data/torque-curves.json: histories under torques over speed, by SciPy alone.

Each case holds the text of a model and, written out again by hand, its equations of motion. They are integrated by
scipy.integrate.solve_ivp (DOP853, rtol 1e-10) with numpy.interp as the torque over speed. Run with Debian's
python3-scipy:

    python3 tools/reference/make_torque_curves.py
"""

import json
import math
import os

import numpy as np
import scipy
from scipy.integrate import solve_ivp

HERE = os.path.dirname(os.path.abspath(__file__))
TARGET = os.path.join(HERE, "..", "..", "test", "reference", "data", "torque-curves.json")
RPM = 2 * math.pi / 60
#: s; a corner of a curve inside a step costs its square.
MAX_STEP = 5e-5


def curve(rows):
    """Straight between rows of rpm and N*m, constant outside."""
    speeds = np.array([r[0] for r in rows]) * RPM
    torques = np.array([r[1] for r in rows], dtype=float)
    return lambda w: float(np.interp(w, speeds, torques))


def rows_text(rows):
    return "".join(f"        {s} rpm  {t} N*m\n" for s, t in rows)


MOTOR = [(0, 62), (300, 55), (900, 71), (1300, 118), (1440, 96), (1500, 0), (1560, -96)]
FAN = [(0, 0), (250, -1.4), (500, -5.5), (750, -12.4), (1000, -22), (1250, -34.4), (1500, -49.5)]
STICK = [(-40, 9), (-10, 4), (10, -4), (40, -9)]


def started_fan():
    """Motor, coupling and fan, two curves at once, with torque ripple at six a turn of 600 rpm."""
    j1, j2, k, c, b = 0.21, 1.7, 5.2e3, 1.1, 0.03
    motor, fan = curve(MOTOR), curve(FAN)
    ripple, ripple_hz = 6.5, 60.0

    def rate(t, y):
        q1, q2, w1, w2 = y
        twist = k * (q1 - q2) + c * (w1 - w2)
        drive = motor(w1) + ripple * math.cos(2 * math.pi * ripple_hz * t)
        return [w1, w2, (drive - twist - b * w1) / j1, (fan(w2) + twist) / j2]

    text = f"""thrum 1
inertia motor = {j1} kg*m^2
inertia fan = {j2} kg*m^2
spring coupling between motor and fan = {k} N*m/rad
damper rubber between motor and fan = {c} N*m*s/rad
damper bearings between motor and ground = {b} N*m*s/rad
torque start on motor
    curve =
{rows_text(MOTOR)}torque load on fan
    curve =
{rows_text(FAN)}torque ripple on motor
    amplitude = {ripple} N*m
    frequency = {ripple_hz} Hz
ask history run_up
    of = motor.speed, fan.speed, coupling.torque
    lasting = 4 s
"""
    of = {
        "motor.speed": lambda y: y[2],
        "fan.speed": lambda y: y[3],
        "coupling.torque": lambda y: k * (y[0] - y[1]),
    }
    return "started_fan", text, rate, [0, 0, 0, 0], 4.0, of


def sticking_table():
    """A spring-held table on a curve that drags it: its speed goes to and fro over the rows, struck at 0.37 s."""
    j, k, blow = 0.6, 420.0, 0.9
    drag = curve(STICK)
    start = 25 * RPM

    def rate(t, y):
        q, w = y
        return [w, (drag(w) - k * q) / j]

    text = f"""thrum 1
inertia table = {j} kg*m^2
    starts_at = 0.2 rad
    starts_moving = 25 rpm
spring bar between table and ground = {k} N*m/rad
torque drag on table
    curve =
{rows_text(STICK)}torque blow on table
    impulse = {blow} N*m*s
    start = 0.37 s
ask history swing
    of = table.angle, table.speed, bar.torque
    lasting = 1.2 s
"""
    of = {"table.angle": lambda y: y[0], "table.speed": lambda y: y[1], "bar.torque": lambda y: k * y[0]}
    return "sticking_table", text, rate, [0.2, start], 1.2, of, (0.37, [0, blow / j])


def geared_mill():
    """A motor geared 4 to 1 to a mill through a shaft; the mill's drag is a falling curve, which shakes the shaft."""
    j1, j2, j3, k, ratio = 0.05, 0.9, 2.4, 8.0e3, 4
    motor = curve(MOTOR)
    mill_rows = [(0, -150), (60, -90), (150, -60), (400, -75)]
    mill = curve(mill_rows)
    inertia = j2 + ratio**2 * j1

    def rate(t, y):
        q2, q3, w2, w3 = y
        twist = k * (q2 - q3)
        return [w2, w3, (ratio * motor(ratio * w2) - twist) / inertia, (twist + mill(w3)) / j3]

    text = f"""thrum 1
inertia motor = {j1} kg*m^2
inertia wheel = {j2} kg*m^2
inertia mill = {j3} kg*m^2
bind motor = {ratio} * wheel
spring shaft between wheel and mill = {k} N*m/rad
torque start on motor
    curve =
{rows_text(MOTOR)}torque drag on mill
    curve =
{rows_text(mill_rows)}ask history run_up
    of = motor.speed, mill.speed, shaft.torque
    lasting = 2 s
"""
    of = {
        "motor.speed": lambda y: ratio * y[2],
        "mill.speed": lambda y: y[3],
        "shaft.torque": lambda y: k * (y[0] - y[1]),
    }
    return "geared_mill", text, rate, [0, 0, 0, 0], 2.0, of


def integrated(rate, start, times):
    """States at the times."""
    found = solve_ivp(
        rate, (times[0], times[-1]), start, method="DOP853", t_eval=times, rtol=1e-10, atol=1e-12, max_step=MAX_STEP
    )
    if not found.success:
        raise RuntimeError(found.message)
    return found.y.T


def solved(name, text, rate, start, lasting, of, blow=None):
    times = np.linspace(0, lasting, 25)
    if blow is None:
        states = integrated(rate, start, times)
    else:
        at, change = blow
        before = integrated(rate, start, np.append(times[times < at], at))
        after = integrated(rate, before[-1] + np.array(change), np.insert(times[times >= at], 0, at))
        states = np.vstack([before[:-1], after[1:]])
    series = {key: [float(f(y)) for y in states] for key, f in of.items()}
    return {"name": name, "text": text, "timeS": [float(t) for t in times], "series": series}


def main():
    cases = [solved(*case()) for case in (started_fan, sticking_table, geared_mill)]
    with open(TARGET, "w", encoding="utf-8") as file:
        json.dump({"made_by": f"tools/reference/make_torque_curves.py, SciPy {scipy.__version__}", "cases": cases}, file, indent=1)
        file.write("\n")


if __name__ == "__main__":
    main()
