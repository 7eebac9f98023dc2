"""Heaters by an energy balance with CoolProp's enthalpies."""

from common import case, h_at, kelvin, readings, state


def heater(title, t1, rh, t2, p, volts, amperes):
    r, c = readings("entering", t1, "relative_humidity", rh)
    s = state(t1, "relative_humidity", rh, p)
    power = 3**0.5 * volts * amperes
    m = power / (h_at(kelvin(t2), s["w"], p) - s["h"])
    given = {**r, "leaving.dry_bulb": [t2, "degC"], "power.voltage": [volts, "V"], "power.current": [amperes, "A"],
             "power.factor": [1, "1"]}
    return case("heat_rise", title, {**c, "power.by": "three_phase"}, given, p, {
        "dry_air": [m, 2e-5, 0], "flow_entering": [m * s["v"], 2e-5, 0], "power": [power, 1e-9, 0],
    })


CASES = [
    heater("electric heater at 87 kPa", 12.0, 0.4, 31.0, 87_000, 400.0, 36.0),
    heater("electric heater at sea level", 20.0, 0.3, 44.0, 101_325, 415.0, 22.4),
]
