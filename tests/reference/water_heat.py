"""Water and glycols by CoolProp: IAPWS-95 for water, its incompressible glycols (Melinder) for mixtures.

The two formulations of water differ by up to 1e-5 in the heat capacity: hence 2e-5 of a heat.
"""

from common import fluid, kelvin

BAR = 1e5


def side(name, flow, t1, t2):
    """Density, mass flow and heat gained, with the meter where the water enters."""
    a, b = kelvin(t1), kelvin(t2)
    density = fluid("D", "T", a, "P", BAR, name)
    steps = 400
    # The heat capacity summed up: an enthalpy difference of an incompressible fluid holds its own conventions.
    width = (b - a) / steps
    change = sum(fluid("C", "T", a + (n + 0.5) * width, "P", BAR, name) for n in range(steps)) * width
    return density, flow * density, flow * density * change


def plain(check, title, choices, given, results):
    return {"check": check, "title": title, "choices": choices, "readings": given, "results": results}


def water(title, flow, t1, t2, glycol=None, share=None, power=None):
    name = "Water" if glycol is None else f"INCOMP::{ {'ethylene_glycol': 'MEG', 'propylene_glycol': 'MPG'}[glycol] }[{share}]"
    density, mass_flow, heat = side(name, flow, t1, t2)
    given = {"water.rate": [flow, "m3/s"], "water.entering": [t1, "degC"], "water.leaving": [t2, "degC"]}
    choices = {"water.fluid": glycol or "water"}
    out = {"heat": [heat, 2e-5, 0], "density": [density, 5e-6, 0], "mass_flow": [mass_flow, 5e-6, 0]}
    if glycol:
        choices["water.strength_by"] = "mass"
        given["water.mass_share"] = [share, "1"]
        freezes = fluid("T_FREEZE", "T", kelvin(20), "P", BAR, name)
        out["freezes_at"] = [freezes, 0, 1e-3]
    if power:
        choices["power.covers"] = "compressor"
        given["power.input"] = [power, "W"]
        out["performance"] = [abs(heat) / power, 2e-5, 0]
    return plain("water_heat", title, choices, given, out)


def chiller(title, cold, warm, power):
    cooling, rejected = -side("Water", *cold)[2], side("Water", *warm)[2]
    given = {"power.input": [power, "W"]}
    for name, (flow, t1, t2) in (("evaporator", cold), ("condenser", warm)):
        given |= {f"{name}.rate": [flow, "m3/s"], f"{name}.entering": [t1, "degC"], f"{name}.leaving": [t2, "degC"]}
    choices = {"evaporator.fluid": "water", "condenser.fluid": "water", "power.covers": "compressor", "motor.kind": "hermetic"}
    return plain("chiller_balance", title, choices, given, {
        "cooling": [cooling, 2e-5, 0], "rejected": [rejected, 2e-5, 0],
        "misfit": [rejected - cooling - power, 0, 2e-5 * (rejected + cooling)], "performance": [cooling / power, 2e-5, 0],
        "input_per_cooling": [power / cooling, 2e-5, 0],
    })


CASES = [
    water("chilled water with its input", 0.0127, 5.2, 13.4, power=52_000.0),
    water("hot water", 0.0021, 78.0, 61.5),
    water("ethylene glycol below zero", 0.0056, -8.5, -3.0, "ethylene_glycol", 0.36),
    water("propylene glycol, warm", 0.0043, 45.0, 38.0, "propylene_glycol", 0.44),
    chiller("chiller on water", (0.0191, 11.4, 6.1), (0.0237, 28.3, 33.4), 78_500.0),
]
