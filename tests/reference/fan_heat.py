"""Fans by an energy balance with CoolProp's enthalpies."""

from common import air, case, readings, state


def fan(title, t, rh, p, flow, pressure, efficiency, motor):
    r, c = readings("entering", t, "relative_humidity", rh)
    s = state(t, "relative_humidity", rh, p)
    heat = flow * pressure / efficiency / motor
    m = flow / s["v"]
    after = air("T", "H", s["h"] + heat / m, "W", s["w"], "P", p)
    given = {**r, "flow.rate": [flow, "m3/s"], "fan.total_pressure": [pressure, "Pa"],
             "fan.efficiency": [efficiency * 100, "%"], "fan.motor_efficiency": [motor * 100, "%"]}
    choices = {**c, "flow.basis": "actual_entering", "fan.motor": "in_stream"}
    return case("fan_heat", title, choices, given, p, {
        "rise": [after - s["t"], 2e-5, 1e-5], "leaving": [after, 0, 1e-4], "heat": [heat, 1e-9, 0],
    })


CASES = [
    fan("supply fan at 79 kPa", 12.5, 0.93, 79_000, 5.5, 1250.0, 0.67, 0.92),
    fan("return fan at sea level", 24.0, 0.45, 101_325, 3.1, 350.0, 0.55, 0.88),
]
