"""Coil lines built with CoolProp from an apparatus dew point and a bypass factor."""

from common import air, case, kelvin


def coil(title, adp, t1, w1_above, p, bypass):
    w = air("W", "T", kelvin(adp), "R", 1.0, "P", p)
    w1 = w + w1_above
    t2, w2 = adp + bypass * (t1 - adp), w + bypass * w1_above
    given = {"entering.dry_bulb": [t1, "degC"], "entering.humidity_ratio": [w1, "kg/kg"],
             "leaving.dry_bulb": [t2, "degC"], "leaving.humidity_ratio": [w2, "kg/kg"]}
    choices = {"entering.humidity_by": "humidity_ratio", "leaving.humidity_by": "humidity_ratio"}
    return case("coil", title, choices, given, p, {
        "adp": [kelvin(adp), 0, 1e-3], "bypass": [bypass, 0, 1e-4], "adp_humidity": [w, 1e-4, 0],
    })


CASES = [
    coil("six rows at 82 kPa", 9.0, 27.0, 0.0021, 82_000, 0.08),
    coil("two rows at sea level", 11.5, 25.0, 0.0018, 101_325, 0.31),
]
