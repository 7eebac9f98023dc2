"""Steam and evaporating water into air with CoolProp."""

from common import air, case, fluid, kelvin, readings, state


def pad(title, t, wet_bulb, p, effectiveness, m):
    r, c = readings("entering", t, "wet_bulb", wet_bulb)
    s = state(t, "wet_bulb", wet_bulb, p)
    leaving = kelvin(t - effectiveness * (t - wet_bulb))
    w = air("W", "T", leaving, "B", kelvin(wet_bulb), "P", p)
    given = {**r, "pad.effectiveness": [effectiveness * 100, "%"], "flow.dry_air": [m, "kg/s"]}
    choices = {**c, "method.by": "evaporative", "pad.by": "effectiveness", "flow.basis": "dry_air"}
    return case("humidifying", title, choices, given, p, {
        "dry_bulb": [leaving, 0, 1e-4], "humidity_ratio": [w, 3e-5, 0], "water": [m * (w - s["w"]), 1e-4, 0],
    })


def steam(title, t, rh, p, water, m, pressure):
    r, c = readings("entering", t, "relative_humidity", rh)
    s = state(t, "relative_humidity", rh, p)
    h_steam = fluid("H", "P", pressure, "Q", 1, "Water")
    w, h = s["w"] + water / m, s["h"] + water / m * h_steam
    leaving = air("T", "H", h, "W", w, "P", p)
    given = {**r, "target.water": [water * 3600, "kg/h"], "flow.dry_air": [m, "kg/s"], "steam.pressure": [pressure, "Pa"]}
    choices = {**c, "method.by": "steam", "target.by": "water", "flow.basis": "dry_air"}
    return case("humidifying", title, choices, given, p, {
        "dry_bulb": [leaving, 0, 2e-3], "humidity_ratio": [w, 2e-6, 0], "enthalpy": [h, 1e-4, 0],
    })


CASES = [
    pad("pad at 92 kPa", 36.0, 19.0, 92_000, 0.75, 2.4),
    steam("steam of 200 kPa", 18.0, 0.2, 98_000, 0.008, 2.0, 200_000),
]
