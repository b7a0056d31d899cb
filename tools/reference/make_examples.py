#!/usr/bin/env python3
"""Writes test/reference/data/examples.json: natural frequencies and steady responses of examples/, by SciPy alone.

A small reader of its own takes masses, springs, dampers, binds and drives from the text (only what the examples
use), so that a slip in reading would show as well as one in the mechanics. Run with Debian's python3-scipy:

    python3 tools/reference/make_examples.py
"""

import glob
import json
import math
import os
import re

import numpy as np
import scipy
import scipy.linalg as la

HERE = os.path.dirname(os.path.abspath(__file__))
ROOT = os.path.join(HERE, "..", "..")
INCH, LBF = 0.0254, 4.4482216152605
GRAVITY = 9.80665
#: NIST SP 811; rates in Hz.
UNITS = {
    "kg": 1, "t": 1e3, "g": 1e-3, "lbm": LBF / GRAVITY, "m": 1, "mm": 1e-3, "um": 1e-6, "in": INCH, "ft": 12 * INCH,
    "s": 1, "ms": 1e-3, "N": 1, "kN": 1e3, "MN": 1e6, "lbf": LBF, "psi": LBF / INCH**2, "rad": 1,
    "rpm": 1 / 60, "Hz": 1, "%": 0.01, "gn": GRAVITY,
}
NUMBER = re.compile(r"(?<![\w.])(\d+(?:\.\d+)?(?:e[+-]?\d+)?)\s*((?:1/)?[%A-Za-z][A-Za-z]*(?:\^\d)?(?:[*/][A-Za-z]+(?:\^\d)?)*)?")
NOT_UNITS = {"at", "and", "to", "or"}


def unit_factor(text):
    factor = 1.0
    for sign, name, power in re.findall(r"(^|[*/])([%A-Za-z]+)(?:\^(\d))?", text):
        factor *= UNITS[name] ** ((-1 if sign == "/" else 1) * int(power or 1))
    return factor


def shaft(modulus, diameter, length):
    return modulus * math.pi * diameter**4 / (32 * length)


class Model:
    def __init__(self, path):
        self.lets, self.mass, self.order = {}, {}, []
        self.elements, self.binds, self.drives, self.turning = [], {}, {}, False
        for head, details in statements(path):
            self.take(head, details)

    def value(self, text):
        """An expression in SI: numbers with units become floats, names come from the lets."""
        text = re.split(r"\+/-", text)[0]

        def swap(match):
            number, unit = match.group(1), match.group(2)
            if unit is None or unit in NOT_UNITS or (unit.split("*")[0].split("/")[0] in self.lets):
                return number + (" " + unit if unit else "")
            return f"({number} * {unit_factor(unit)!r})"

        return eval(NUMBER.sub(swap, text), {"shaft": shaft, "sqrt": math.sqrt}, dict(self.lets))

    def take(self, head, details):
        word, _, rest = head.partition(" ")
        name, _, value = (x.strip() for x in rest.partition("="))
        if word == "let":
            self.lets[name] = self.value(value)
        elif word in ("mass", "inertia"):
            self.mass[name] = self.value(value)
            self.order.append(name)
            self.turning |= word == "inertia"
        elif word == "junction":
            self.mass[name] = 0.0
            self.order.append(name)
        elif word == "bind":
            factor, other = value.rsplit("*", 1)
            self.binds[name] = (self.value(factor.replace("-", "-1 *", 1)), other.strip())
        elif word in ("spring", "damper"):
            label, a, b = re.match(r"(\w+) between (\w+) and (\w+)", name).groups()
            count = int(details.get("count", "1"))
            number = self.value(value) * count
            eta = self.value(details.get("loss_factor", "0"))
            self.elements.append((word, label, a, b, number, eta))
            if "damping_ratio" in details:
                ratio, at = details["damping_ratio"].split(" at ")
                c = 2 * self.value(ratio) * number / (2 * math.pi * self.value(at))
                self.elements.append(("damper", label, a, b, c, 0))
        elif word in ("force", "torque"):
            label, on = re.match(r"(\w+) on (\w+)", name).groups()
            self.drives[label] = (on, details)

    def form(self, a, b):
        f = np.zeros(len(self.order))
        for place, sign in ((a, 1), (b, -1)):
            if place in self.mass:
                f += sign * self.unit(place)
        return f

    def unit(self, name):
        factor, target = self.binds.get(name, (1.0, name))
        f = np.zeros(len(self.order))
        f[self.order.index(target)] = factor
        return f

    def matrices(self):
        n = len(self.order)
        M, C, K = np.zeros((n, n)), np.zeros((n, n)), np.zeros((n, n), dtype=complex)
        for name, value in self.mass.items():
            M += value * np.outer(self.unit(name), self.unit(name))
        for kind, _, a, b, value, eta in self.elements:
            f = self.form(a, b)
            if kind == "spring":
                K += value * (1 + 1j * eta) * np.outer(f, f)
            else:
                C += value * np.outer(f, f)
        free = [i for i, name in enumerate(self.order) if name not in self.binds]
        pick = np.ix_(free, free)
        return M[pick], C[pick], K[pick], free

    def frequencies(self):
        M, _, K, _ = self.matrices()
        heavy, light = np.flatnonzero(np.diag(M) > 0), np.flatnonzero(np.diag(M) == 0)
        k = K.real[np.ix_(heavy, heavy)]
        if light.size:
            side = K.real[np.ix_(light, heavy)]
            k = k - side.T @ la.solve(K.real[np.ix_(light, light)], side)
        w2 = la.eigh(k, M[np.ix_(heavy, heavy)], eigvals_only=True)
        return [math.sqrt(x) / (2 * math.pi) for x in w2 if x > 1e-9 * w2.max()]

    def steady(self, drive, hz):
        """Complex displacement of every free coordinate for one drive at a frequency."""
        M, C, K, free = self.matrices()
        on, details = self.drives[drive]
        w = 2 * math.pi * hz
        size = self.value(details["unbalance"]) * w * w if "unbalance" in details else self.value(details["amplitude"])
        x = la.solve(K + 1j * w * C - w * w * M, size * self.unit(on)[free].astype(complex))
        full = np.zeros(len(self.order), dtype=complex)
        full[free] = x
        for name, (factor, target) in self.binds.items():
            full[self.order.index(name)] = factor * full[self.order.index(target)]
        return full, w, size

    def force(self, names, full, w):
        total = 0
        for kind, label, a, b, value, eta in self.elements:
            if label in names:
                travel = sum(s * full[self.order.index(p)] for p, s in ((a, 1), (b, -1)) if p in self.mass)
                total += (value * (1 + 1j * eta) if kind == "spring" else 1j * w * value) * travel
        return total


def statements(path):
    head, details = None, {}
    for line in open(path, encoding="utf-8"):
        line = line.split("#")[0].rstrip()
        if not line.strip() or line.lstrip().startswith(">"):
            continue
        if not line.startswith(" "):
            if head:
                yield head, details
            head, details = line, {}
        elif "=" in line:
            key, value = line.split("=", 1)
            details[key.strip()] = value.strip()
    if head:
        yield head, details


#: Expectations that are a steady response: example -> expectation -> what it is.
STEADY = {
    "ventilation-fan": {
        "quiet_floor": ("share", "fan_imbalance", "fan_speed", ["isolators", "isolator_rubber"]),
        "slab_smooth": ("velocity", "fan_imbalance", "fan_speed", "slab"),
        "motor_smooth": ("velocity", "motor_imbalance", "motor_speed", "motor"),
    },
    "pump-line": {
        "coupling_holds": ("force", "vane_pass", "pump_speed * vanes", ["coupling"]),
        "ripple_stays": ("force", "ripple", "18 * motor_speed", ["coupling"]),
    },
    "instrument-bench": {"steady_head": ("velocity", "rack_fan", "2800 rpm", "head")},
    "gate-actuator": {"frame_smooth": ("velocity", "pump", "pump_speed", "frame")},
    "quay-generator": {
        "roof_quiet": ("velocity", "first_order", "engine_speed", "roof"),
        "isolates": ("share", "first_order", "engine_speed", ["mounts", "mount_rubber"]),
        "skid_smooth": ("velocity", "half_order", "0.5 * engine_speed", "skid"),
    },
}


def expectation(model, kind, drive, rate, what):
    full, w, size = model.steady(drive, model.value(rate))
    if kind == "velocity":
        return abs(1j * w * full[model.order.index(what)])
    force = abs(model.force(what, full, w))
    return force / size if kind == "share" else force


def main():
    out = {"madeBy": "tools/reference/make_examples.py", "scipy": scipy.__version__, "examples": {}}
    for path in sorted(glob.glob(os.path.join(ROOT, "examples", "*.thrum"))):
        name = os.path.basename(path)[: -len(".thrum")]
        model = Model(path)
        out["examples"][name] = {
            "frequencyHz": [float(f"{f:.13g}") for f in model.frequencies()],
            "expectations": {k: float(f"{expectation(model, *v):.13g}") for k, v in STEADY.get(name, {}).items()},
        }
    with open(os.path.join(ROOT, "test", "reference", "data", "examples.json"), "w", encoding="utf-8") as target:
        json.dump(out, target, indent=1)
        target.write("\n")


if __name__ == "__main__":
    main()
