#!/usr/bin/env python3
"""The whole-process peer: reads a model (JSON of masses and springs), prints its natural frequencies, ends."""

import json
import sys

import numpy as np
import scipy.linalg as la

with open(sys.argv[1], encoding="utf-8") as source:
    model = json.load(source)
n = len(model["mass"])
M, K = np.diag(np.array(model["mass"])), np.zeros((n, n))
for a, b, value in model["springs"]:
    K[a, a] += value
    if b >= 0:
        K[b, b] += value
        K[a, b] -= value
        K[b, a] -= value
for f in np.sqrt(np.maximum(la.eigh(K, M, eigvals_only=True), 0)) / (2 * np.pi):
    print(f"{f:.6g} Hz")
