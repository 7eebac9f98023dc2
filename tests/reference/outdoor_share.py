"""Mixtures made with CoolProp; the share that they were made with must come out."""

from common import air, case, readings, state


def share(title, back, outdoor, p, x):
    given, choices, states = {}, {}, []
    for name, corner in (("return", back), ("outdoor", outdoor)):
        r, c = readings(name, *corner)
        given.update(r)
        choices.update(c)
        states.append(state(*corner, p))
    r, o = states
    w, h = (r[k] + x * (o[k] - r[k]) for k in "wh")
    t = air("T", "H", h, "W", w, "P", p)
    given.update({"mixed.dry_bulb": [t - 273.15, "degC"], "mixed.humidity_ratio": [w, "kg/kg"]})
    choices["mixed.humidity_by"] = "humidity_ratio"
    return case("outdoor_share", title, choices, given, p, {
        "temperature": [x, 0, 2e-5], "moisture": [x, 0, 2e-5], "enthalpy": [x, 0, 2e-5],
        "volume_share": [x * o["v"] / (x * o["v"] + (1 - x) * r["v"]), 0, 2e-5],
    })


RH = "relative_humidity"
CASES = [
    share("winter at 86 kPa", (22.0, RH, 0.4), (2.0, RH, 0.8), 86_000, 0.22),
    share("summer at sea level", (24.0, RH, 0.5), (35.0, RH, 0.5), 101_325, 0.35),
]
