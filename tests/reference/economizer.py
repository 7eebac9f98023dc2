"""Loads of a coil over the share of outdoor air, with CoolProp."""

from common import air, case, h_at, kelvin, readings, state


def load(back, outdoor, x, coil, rh, m, p):
    w, h = (back[k] + x * (outdoor[k] - back[k]) for k in "wh")
    leaving = min(w, air("W", "T", kelvin(coil), "R", rh, "P", p))
    return m * (h - h_at(kelvin(coil), leaving, p))


def economizer(title, back, outdoor, p, m, least, coil):
    given, choices, states = {}, {}, []
    for name, corner in (("return", back), ("outdoor", outdoor)):
        r, c = readings(name, *corner)
        given.update(r)
        choices.update(c)
        states.append(state(*corner, p))
    given.update({"flow.dry_air": [m, "kg/s"], "damper.least": [least * 100, "%"], "coil.leaving": [coil, "degC"]})
    closed, full = (load(*states, x, coil, 0.95, m, p) for x in (least, 1.0))
    return case("economizer", title, {**choices, "flow.basis": "dry_air"}, given, p, {
        "load_least": [closed, 3e-5, 1], "load_open": [full, 3e-5, 1], "saving": [closed - full, 1e-3, 3],
    })


RH = "relative_humidity"
CASES = [
    economizer("humid morning at 95 kPa", (23.5, RH, 0.5), (21.0, RH, 0.95), 95_000, 3.2, 0.25, 12.5),
    economizer("dry afternoon at 80 kPa", (25.0, RH, 0.4), (22.0, RH, 0.3), 80_000, 4.5, 0.15, 13.5),
]
