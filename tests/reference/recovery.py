"""Exchangers with CoolProp's states."""

from common import case, process, readings, state


def recovery(title, device, corners, p, supply, back):
    given, choices, states = {}, {"device.kind": device}, []
    for name, corner in zip(("outdoor", "supply", "return", "exhaust"), corners):
        r, c = readings(name, *corner)
        given.update(r)
        choices.update(c)
        states.append(state(*corner, p))
    one, two, three, four = states
    m2, m3 = supply / two["v"], back / three["v"]
    given.update({"supply_flow.rate": [supply, "m3/s"], "return_flow.rate": [back, "m3/s"]})
    choices.update({"supply_flow.basis": "actual_supply", "return_flow.basis": "actual_return"})
    share = m2 / min(m2, m3)
    effect = {x: share * (one[x] - two[x]) / (one[x] - three[x]) for x in "twh"}
    parts = process(one, two, m2)
    return case("recovery", title, choices, given, p, {
        "sensible_effectiveness": [effect["t"], 1e-6, 0], "latent_effectiveness": [effect["w"], 1e-4, 0],
        "total_effectiveness": [effect["h"], 2e-5, 0], "total": parts["total"], "sensible": parts["sensible"],
        "moisture": parts["moisture"], "exhaust_side": [m3 * (three["h"] - four["h"]), 2e-5, 0.5],
        "exhaust_moisture": [m3 * (three["w"] - four["w"]), 1e-4, 1e-8],
    })


RH = "relative_humidity"
CASES = [
    recovery("wheel in summer at 90 kPa", "moist_wheel",
             [(33.0, RH, 0.5), (27.2, RH, 0.52), (24.0, RH, 0.5), (30.4, RH, 0.51)], 90_000, 1.7, 1.5),
    recovery("wheel in a mild winter", "moist_wheel",
             [(4.0, RH, 0.8), (16.0, RH, 0.5), (21.0, RH, 0.4), (8.5, RH, 0.62)], 101_325, 2.1, 2.3),
]
