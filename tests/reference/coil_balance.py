"""One coil by three routes, each by CoolProp: the air's enthalpies, the water's own, and what drained."""

from common import case, fluid, h_at, readings, state
from water_heat import side


def balance(title, first, second, p, flow, water, drain):
    r1, c1 = readings("entering", *first)
    r2, c2 = readings("leaving", *second)
    a, b = state(*first, p), state(*second, p)
    m, dried = flow / b["v"], a["w"] - b["w"]
    litres, at = drain
    kelvins = at + 273.15
    density = fluid("D", "T", kelvins, "P", p, "Water")
    drained = litres / 3.6e6 * density
    # Both enthalpies of CoolProp count liquid from the triple point.
    liquid = fluid("H", "T", kelvins, "P", p, "Water")
    by_air = m * (a["h"] - b["h"] - dried * liquid)
    one, two = h_at(a["t"], b["w"], p), b["h"]
    vapour = (a["h"] - one) / dried
    by_drain = m * (one - two) + drained * (vapour - liquid)
    by_water = side("Water", *water)[2]
    given = {**r1, **r2, "flow.rate": [flow, "m3/s"], "water.rate": [water[0], "m3/s"],
             "water.entering": [water[1], "degC"], "water.leaving": [water[2], "degC"],
             "drain.rate": [litres / 3.6e6, "m3/s"], "drain.temperature": [at, "degC"]}
    choices = {**c1, **c2, "flow.basis": "actual_leaving", "water.fluid": "water"}
    return case("coil_balance", title, choices, given, p, {
        "air": [by_air, 2e-5, 0.5], "water": [by_water, 2e-5, 0], "drain": [by_drain, 2e-5, 0.5],
    })


CASES = [
    balance("coil on chilled water at 91 kPa", (27.5, "relative_humidity", 0.51), (11.8, "relative_humidity", 0.95), 91_000, 1.62,
            (0.00185, 6.4, 12.1), (17.2, 11.5)),
    balance("coil at 75 kPa that disagrees", (30.0, "wet_bulb", 19.0), (13.0, "wet_bulb", 12.4), 75_000, 2.4,
            (0.0024, 7.2, 11.9), (20.5, 12.6)),
]
