"""What the reference cases share: CoolProp, air states, readings as a person would type them."""

from CoolProp.CoolProp import HAPropsSI as air
from CoolProp.CoolProp import PropsSI as fluid

EPSILON = 0.621945


def kelvin(celsius):
    return celsius + 273.15


def state(t, by, value, p):
    """A state from a dry bulb in °C and one humidity; all in SI."""
    name = {"relative_humidity": "R", "wet_bulb": "B", "dew_point": "D", "humidity_ratio": "W"}[by]
    given = kelvin(value) if name in "BD" else value
    args = ("T", kelvin(t), name, given, "P", p)
    w = air("W", *args)
    return {"t": kelvin(t), "w": w, "h": air("H", *args), "v": air("V", *args), "p": p, "args": args}


def h_at(t, w, p):
    return air("H", "T", t, "W", w, "P", p)


def readings(prefix, t, by, value):
    kinds = {"relative_humidity": "1", "wet_bulb": "degC", "dew_point": "degC", "humidity_ratio": "kg/kg"}
    return {f"{prefix}.dry_bulb": [t, "degC"], f"{prefix}.{by}": [value, kinds[by]]}, {f"{prefix}.humidity_by": by}


def case(check, title, choices, given, p, results):
    choices = {"pressure.by": "read", **choices}
    given = {"pressure.read": [p, "Pa"], **given}
    return {"check": check, "title": title, "choices": choices, "readings": given, "results": results}


def process(a, b, m, water=None):
    """Total, sensible, latent and duty by the mean of the two ways round the corner."""
    one, other = h_at(b["t"], a["w"], a["p"]), h_at(a["t"], b["w"], a["p"])
    sensible = 0.5 * ((one - a["h"]) + (b["h"] - other))
    latent = 0.5 * ((other - a["h"]) + (b["h"] - one))
    total, dw = b["h"] - a["h"], b["w"] - a["w"]
    out = {"total": [m * total, 2e-5, 0.5], "sensible": [m * sensible, 2e-5, 0.5], "latent": [m * latent, 1e-4, 0.5],
           "moisture": [m * dw, 1e-4, 1e-8], "dry_air": [m, 2e-6, 0], "delta_h": [total, 2e-5, 0.1]}
    if water is not None:
        out["duty"] = [m * (total - dw * water), 2e-5, 0.5]
    return out
