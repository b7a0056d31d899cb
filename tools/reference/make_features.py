#!/usr/bin/env python3
"""Writes test/reference/features/*.thrum and test/reference/data/features.json.

Every number is computed here by NumPy and SciPy (or a closed form), none by Thrum. Run with Debian's python3-scipy and
python3-mpmath:

    python3 tools/reference/make_features.py
"""

import importlib
import json
import os
import sys

HERE = os.path.dirname(os.path.abspath(__file__))
sys.path.insert(0, HERE)

from features.book import MODELS  # noqa: E402

GROUPS = ["units", "joins", "roots", "drives", "sweeps", "histories", "judgement", "corners"]


def main():
    out = os.path.join(HERE, "..", "..", "test", "reference", "features")
    os.makedirs(out, exist_ok=True)
    for group in sys.argv[1:] or GROUPS:
        importlib.import_module(f"features.{group}")
    for entry in MODELS:
        with open(os.path.join(out, entry["name"] + ".thrum"), "w", encoding="utf-8") as file:
            file.write(entry.pop("text"))
        for name, content in entry.pop("files").items():
            with open(os.path.join(out, name), "wb") as file:
                file.write(content.encode("utf-8") if isinstance(content, str) else content)
    with open(os.path.join(out, "..", "data", "features.json"), "w", encoding="utf-8") as file:
        file.write("[\n" + ",\n".join(json.dumps(entry) for entry in MODELS) + "\n]\n")
    print(len(MODELS), "models,", sum(len(m["numbers"]) for m in MODELS), "numbers")


if __name__ == "__main__":
    main()
