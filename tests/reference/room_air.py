"""Flows brought to the room's state with CoolProp's volumes."""

from common import case, readings, state

RH = "relative_humidity"


def room(title, air, supply_air, p, sides, exhaust, supply):
    """Exhaust read as standard air at 1.2 kg/m3 of dry air, supply actual at its outlet; L/s."""
    given, choices = readings("room", *air)
    more, picks = readings("supply_air", *supply_air)
    here, there = state(*air, p), state(*supply_air, p)
    volume = sides[0] * sides[1] * sides[2]
    out = exhaust / 1000 * 1.2 * here["v"]
    into = supply / 1000 / there["v"] * here["v"]
    given = {**given, **more, "exhaust.rate": [exhaust, "L/s"], "supply.rate": [supply, "L/s"],
             **{f"size.{side}": [m, "m"] for side, m in zip(("length", "width", "height"), sides)}}
    choices = {**choices, **picks, "exhaust.basis": "standard", "supply.basis": "actual_supply"}
    return case("room_air", title, choices, given, p, {
        "exhaust_changes": [out / volume, 2e-6, 0], "supply_changes": [into / volume, 2e-6, 0],
        "offset": [out - into, 1e-4, 1e-7], "volume": [volume, 1e-12, 0],
    })


CASES = [
    room("ward room at 82 kPa", (22.5, RH, 0.45), (13.5, RH, 0.93), 82_000, (6.1, 4.4, 2.7), 260.0, 190.0),
    room("laboratory at sea level", (21.0, RH, 0.5), (27.0, RH, 0.3), 101_325, (9.0, 7.5, 3.1), 640.0, 575.0),
]
