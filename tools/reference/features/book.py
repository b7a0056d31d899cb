"""The list of feature models: a text, what is read from it, and the number that stands for it elsewhere."""

MODELS = []

#: A limit nothing reaches, so that an expectation only says its value. By the unit of the value.
FAR = "1e12"


def model(name, how, body, checks=(), modes=(), codes=None, holds=True, files=None):
    """checks: (expression, SI value, unit of the limit[, relative error[, absolute error[, lines of details]]]).

    modes: (path in the JSON of cases[0], value[, relative error[, absolute error]]); codes: the errors that
    belong to the model, no more and no fewer; files: further files by name.
    """
    assert name not in [m["name"] for m in MODELS], name
    text = ["thrum 1", f"> reference: {how}", f'title "{name.replace("-", " ")}"', "", body.strip("\n"), ""]
    numbers = []
    for i, check in enumerate(checks, 1):
        expression, value, unit = check[:3]
        rel = check[3] if len(check) > 3 and check[3] is not None else 1e-9
        absolute = check[4] if len(check) > 4 and check[4] is not None else 0.0
        details = check[5] if len(check) > 5 else ""
        text.append(f"expect n{i} = {expression} <= {FAR}{' ' + unit if unit else ''}{details}")
        numbers.append({"of": f"n{i}", "says": expression, "value": plain(value), "rel": rel, "abs": absolute})
    if codes is None:
        codes = ["expectation-fails"] if any(n["value"] is None for n in numbers) else []
    holds = holds and not codes and all(n["value"] is not None for n in numbers)
    for entry in modes:
        path, value = entry[:2]
        rel = entry[2] if len(entry) > 2 and entry[2] is not None else 1e-9
        absolute = entry[3] if len(entry) > 3 else 0.0
        numbers.append({"path": path, "value": plain(value), "rel": rel, "abs": absolute})
    MODELS.append({"name": name, "how": how, "text": "\n".join(text) + "\n", "numbers": numbers,
                   "codes": list(codes), "holds": holds, "files": files or {}})


def plain(value):
    if value is None or isinstance(value, (str, bool, list)):
        return value
    return float(value)
