"""Traverses of profiles whose flow is known by integration, with CoolProp's density."""

import math

from common import case, readings, state

SIDE = [0.074, 0.288, 0.500, 0.712, 0.926]


def seventh(x):
    return (2 * min(x, 1 - x)) ** (1 / 7)


def rectangular(title, t, rh, p, static, width, height, centre):
    r, c = readings("duct_air", t, "relative_humidity", rh)
    s = state(t, "relative_humidity", rh, p + static)
    density = (1 + s["w"]) / s["v"]
    given = {**r, "duct.width": [width, "m"], "duct.height": [height, "m"], "duct_air.duct_pressure": [static, "Pa"]}
    for line, x in enumerate(SIDE, 1):
        for point, y in enumerate(SIDE, 1):
            v = centre * seventh(x) * seventh(y)
            given[f"line{line}.point{point}"] = [0.5 * density * v * v, "Pa"]
    choices = {**c, "duct.shape": "rectangular", "duct.size_is": "clear", "grid.read_as": "velocity_pressure"}
    # The mean of x^(1/7) over half a side is 7/8.
    flow = width * height * centre * (7 / 8) ** 2
    return case("traverse", title, choices, given, p, {
        "density": [density, 2e-6, 0], "flow": [flow, 3e-3, 0], "dry_air": [flow / s["v"], 3e-3, 0],
        "area": [width * height, 1e-9, 0],
    })


def round_duct(title, t, rh, p, diameter, centre):
    r, c = readings("duct_air", t, "relative_humidity", rh)
    s = state(t, "relative_humidity", rh, p)
    half = [0.0189, 0.0764, 0.1554, 0.2150, 0.3567]
    points = half + [1 - y for y in reversed(half)]
    given = {**r, "duct.diameter": [diameter, "m"]}
    for line in range(1, 4):
        for point, y in enumerate(points, 1):
            given[f"line{line}.point{point}"] = [centre * seventh(y), "m/s"]
    choices = {**c, "duct.shape": "round", "duct.size_is": "clear", "grid.read_as": "velocity", "grid.meter": "actual"}
    # 2 r (1 - r)^(1/7) over the radius is 49/60.
    flow = math.pi / 4 * diameter**2 * centre * 49 / 60
    return case("traverse", title, choices, given, p, {
        "flow": [flow, 3e-3, 0], "dry_air": [flow / s["v"], 3e-3, 0],
        "velocity": [centre * sum(map(seventh, points)) / len(points), 1e-9, 0],
    })


CASES = [
    rectangular("power-law profile in a rectangular duct", 15.5, 0.8, 88_000, 420, 0.55, 0.4, 11.0),
    round_duct("power-law profile in a round duct", 31.0, 0.35, 97_500, 0.5, 7.5),
]
