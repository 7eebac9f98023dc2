"""Works the checks out with CoolProp alone and prints the cases as JSON. Run by scripts/reference."""

import json
import sys

import coil
import coil_balance
import economizer
import fan_heat
import heat_rise
import humidifying
import outdoor_share
import recovery
import room_air
import surface
import traverse
import water_heat
from common import air, case, fluid, kelvin, process, readings, state


def air_state(title, t, by, value, p):
    r, c = readings("air", t, by, value)
    s = state(t, by, value, p)
    dew = air("D", *s["args"])
    # Below the triple point CoolProp's dew point is over ice: the frost point here.
    point = "dew_point" if dew > 273.16 else "frost_point"
    return case("air_state", title, c, r, p, {
        "humidity_ratio": [s["w"], 2e-6, 0], "enthalpy": [s["h"], 2e-6, 0.5], "specific_volume": [s["v"], 2e-6, 0],
        "relative_humidity": [air("R", *s["args"]), 2e-6, 0], "wet_bulb": [air("B", *s["args"]), 0, 1e-4],
        point: [dew, 0, 2e-4],
    })


def air_heat(title, first, second, p, flow, basis, unit="m3/s", water_at=None):
    r1, c1 = readings("entering", *first)
    r2, c2 = readings("leaving", *second)
    a, b = state(*first, p), state(*second, p)
    m = {"actual_entering": flow / a["v"], "actual_leaving": flow / b["v"], "standard": flow * 1.2, "dry_air": flow}[basis]
    key = "flow.dry_air" if basis == "dry_air" else "flow.rate"
    given = {**r1, **r2, key: [flow, unit]}
    choices = {**c1, **c2, "flow.basis": basis}
    water = None
    if water_at is not None:
        given["water.temperature"] = [water_at, "degC"]
        choices["water.state"] = "condensate"
        water = fluid("H", "T", kelvin(water_at), "P", p, "Water")
    return case("air_heat", title, choices, given, p, process(a, b, m, water))


def book_constants(title, first, second, p, flow, water_at):
    r1, c1 = readings("entering", *first)
    r2, c2 = readings("leaving", *second)
    a, b = state(*first, p), state(*second, p)
    density = 1 / a["v"]
    parts = process(a, b, 1.0)
    dt, dw = b["t"] - a["t"], b["w"] - a["w"]
    water = fluid("H", "T", kelvin(water_at), "P", p, "Water")
    ks = density * parts["sensible"][0] / dt
    kl = density * (parts["latent"][0] / dw - water)
    given = {**r1, **r2, "flow.rate": [flow, "m3/s"], "water.temperature": [water_at, "degC"]}
    choices = {**c1, **c2, "flow.basis": "actual_entering", "water.state": "condensate"}
    return case("book_constants", title, choices, given, p, {
        "total_here": [density, 2e-6, 0], "sensible_here": [ks, 2e-5, 0], "latent_here": [kl, 1e-4, 0],
        "total_error": [1.2 / density - 1, 0, 1e-5], "sensible_error": [1230 / ks - 1, 0, 3e-5],
        "latent_error": [3.01e6 / kl - 1, 0, 2e-4],
    })


def mixing(title, streams, p):
    given, choices = {}, {"streams": str(len(streams))}
    masses, states = [], []
    for number, (t, by, value, flow) in enumerate(streams, 1):
        r, c = readings(f"stream{number}", t, by, value)
        given.update(r)
        choices.update(c)
        given[f"stream{number}_flow.rate"] = [flow, "m3/s"]
        choices[f"stream{number}_flow.basis"] = "actual"
        s = state(t, by, value, p)
        states.append(s)
        masses.append(flow / s["v"])
    m = sum(masses)
    w = sum(mi * s["w"] for mi, s in zip(masses, states)) / m
    h = sum(mi * s["h"] for mi, s in zip(masses, states)) / m
    t = air("T", "H", h, "W", w, "P", p)
    return case("mixing", title, choices, given, p, {
        "dry_bulb": [t, 0, 1e-4], "humidity_ratio": [w, 2e-6, 0], "enthalpy": [h, 2e-6, 0.5], "dry_air": [m, 2e-6, 0],
        "relative_humidity": [air("R", "T", t, "W", w, "P", p), 1e-5, 0],
        "share_mass_1": [masses[0] / m, 2e-6, 0],
    })


def condensate(title, first, second, p, flow, litres, seconds, water_at):
    r1, c1 = readings("entering", *first)
    r2, c2 = readings("leaving", *second)
    a, b = state(*first, p), state(*second, p)
    m, drop = flow / b["v"], a["w"] - b["w"]
    density = fluid("D", "T", kelvin(water_at), "P", p, "Water")
    drained = litres * 1e-3 * density / seconds
    given = {**r1, **r2, "flow.rate": [flow, "m3/s"], "fill1.volume": [litres, "L"], "fill1.time": [seconds, "s"],
             "drain.water_temperature": [water_at, "degC"]}
    return case("condensate", title, {**c1, **c2, "flow.basis": "actual_leaving"}, given, p, {
        "states": [m * drop, 2e-5, 0], "drain": [drained, 2e-6, 0], "ratio": [drained / (m * drop), 2e-5, 0],
        "flow_from_drain": [drained / drop * b["v"], 2e-5, 0],
    })


CASES = [
    air_state("warm room, 70 kPa", 31.0, "relative_humidity", 0.63, 70_000),
    air_state("cool and dry, sea level", 16.5, "wet_bulb", 8.1, 101_325),
    air_state("hot drier, 95 kPa", 62.0, "dew_point", 28.0, 95_000),
    air_state("by humidity ratio, 82 kPa", 21.0, "humidity_ratio", 0.0087, 82_000),
    air_heat("coil at 92 kPa", (28.0, "relative_humidity", 0.55), (12.0, "relative_humidity", 0.93), 92_000, 3.1, "actual_leaving", water_at=11.0),
    air_heat("heating coil, standard flow", (4.0, "relative_humidity", 0.7), (35.0, "humidity_ratio", air("W", "T", 277.15, "R", 0.7, "P", 99_000)), 99_000, 2.2, "standard"),
    air_heat("deep coil at 75 kPa, flow by mass", (30.0, "wet_bulb", 18.0), (9.5, "wet_bulb", 9.0), 75_000, 1.75, "dry_air", "kg/s", water_at=9.0),
    air_heat("humidified and heated", (18.0, "relative_humidity", 0.25), (26.0, "relative_humidity", 0.4), 87_500, 1.4, "actual_entering"),
    book_constants("book at 78 kPa", (27.0, "relative_humidity", 0.5), (13.0, "relative_humidity", 0.9), 78_000, 2.0, 12.0),
    book_constants("book at sea level", (25.0, "relative_humidity", 0.55), (12.0, "relative_humidity", 0.95), 101_325, 1.0, 11.5),
    mixing("two streams at 88 kPa", [(24.0, "relative_humidity", 0.45, 3.0), (35.0, "relative_humidity", 0.3, 1.2)], 88_000),
    mixing("four streams", [(22.0, "relative_humidity", 0.4, 1.0), (5.0, "relative_humidity", 0.8, 0.7), (30.0, "dew_point", 12.0, 0.4), (26.0, "wet_bulb", 17.0, 0.2)], 97_000),
    condensate("drain at 84 kPa", (26.5, "relative_humidity", 0.52), (12.5, "relative_humidity", 0.94), 84_000, 1.9, 3.5, 900.0, 13.0),
]

for more in (outdoor_share, coil, recovery, humidifying, heat_rise, fan_heat, surface, traverse, room_air, water_heat, coil_balance, economizer):
    CASES += more.CASES

json.dump({"note": "CoolProp alone; [value in SI, relative tolerance, absolute tolerance].", "cases": CASES}, sys.stdout, indent=1)
print()
