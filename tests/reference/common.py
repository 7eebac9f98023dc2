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
