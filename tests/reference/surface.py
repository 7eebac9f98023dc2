"""Surfaces by elementary heat balances, solved by bisection instead of in closed form; dew points by CoolProp."""

import math

from common import air, case, kelvin, readings


def balance(inside, outside, resistance, film, area):
    """The surface temperature at which conduction brings what the film takes."""
    low, high = inside, outside
    for _ in range(200):
        middle = 0.5 * (low + high)
        if (middle - inside) / resistance > film * area * (outside - middle):
            high = middle
        else:
            low = middle
    return 0.5 * (low + high)


def surface(title, t, rh, p, inside, thickness, conductivity, film, film_inside=None, diameter=None):
    given, choices = readings("air", t, "relative_humidity", rh)
    given.update({
        "construction.inside": [inside, "degC"], "construction.thickness": [thickness, "m"],
        "construction.conductivity": [conductivity, "W/m.K"], "construction.film_outside": [film, "W/m2.K"],
    })
    if diameter is None:
        given["construction.film_inside"] = [film_inside, "W/m2.K"]
        choices["surface.by"] = "flat"
        resistance, area = 1 / film_inside + thickness / conductivity, 1.0
    else:
        given["construction.diameter"] = [diameter, "m"]
        choices["surface.by"] = "pipe"
        r1, shells = diameter / 2, 100_000
        step = thickness / shells
        resistance = sum(step / (conductivity * 2 * math.pi * (r1 + (n + 0.5) * step)) for n in range(shells))
        area = 2 * math.pi * (r1 + thickness)
    found = balance(kelvin(inside), kelvin(t), resistance, film, area)
    dew = air("D", "T", kelvin(t), "R", rh, "P", p)
    gain = film * area * (kelvin(t) - found)
    return case("surface", title, choices, given, p, {
        "surface": [found, 0, 1e-6], "margin": [found - dew, 0, 3e-4],
        ("heat_flux" if diameter is None else "heat_gain"): [gain, 1e-7, 0],
    })


CASES = [
    surface("duct at 81 kPa", 26.0, 0.55, 81_000, 13.0, 0.03, 0.037, 6.5, film_inside=22.0),
    surface("pipe at sea level", 30.0, 0.7, 101_325, 5.0, 0.02, 0.034, 9.0, diameter=0.0424),
]
