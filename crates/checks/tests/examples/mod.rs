//! An ordinary visit for each check, with ordinary instruments: every reading carries a ±, some of it shared by the
//! readings of one probe ("of dry"), some of it scatter ("in 5 takes").

use dewledger_checks::part::{Part, Source};
use dewledger_checks::{Given, Reading};
use dewledger_quantities::{Kind, PlusMinus, Unit, read, read_plus_minus};

/// Choices, and readings as a person types them: key, quantity, number with its unit, ±.
struct Example {
    choices: &'static [(&'static str, &'static str)],
    readings: &'static [(&'static str, Kind, &'static str, &'static str)],
}

const T: Kind = Kind::Temperature;

fn example(id: &str) -> Option<Example> {
    Some(match id {
        "air_state" => Example {
            choices: &[("pressure.by", "read")],
            readings: &[
                ("pressure.read", Kind::Pressure, "83.4 kPa", "0.2 kPa"),
                ("air.dry_bulb", T, "24.1 C", "0.3 K"),
                ("air.wet_bulb", T, "15.6 C", "0.3 K"),
            ],
        },
        "air_heat" => Example {
            choices: &[
                ("pressure.by", "elevation"),
                ("flow.basis", "actual_leaving"),
                ("water.state", "condensate"),
            ],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "1609 m", ""),
                ("entering.dry_bulb", T, "26.7 C", "0.25 K of dry"),
                ("entering.wet_bulb", T, "17.9 C", "0.25 K of wet"),
                ("leaving.dry_bulb", T, "12.8 C", "0.25 K of dry"),
                ("leaving.wet_bulb", T, "11.6 C", "0.25 K of wet in 5 takes"),
                ("flow.rate", Kind::AirFlow, "2360 L/s", "4 %"),
            ],
        },
        "book_constants" => Example {
            choices: &[("pressure.by", "elevation"), ("flow.basis", "actual_leaving")],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "1609 m", ""),
                ("entering.dry_bulb", T, "26.7 C", "0.2 K"),
                ("entering.wet_bulb", T, "17.9 C", "0.2 K"),
                ("leaving.dry_bulb", T, "12.8 C", "0.2 K"),
                ("leaving.wet_bulb", T, "11.6 C", "0.2 K"),
                ("flow.rate", Kind::AirFlow, "2360 L/s", "4 %"),
            ],
        },
        "mixing" => Example {
            choices: &[
                ("pressure.by", "read"),
                ("stream1_flow.basis", "actual"),
                ("stream2_flow.basis", "actual"),
            ],
            readings: &[
                ("pressure.read", Kind::Pressure, "100.8 kPa", "0.2 kPa"),
                ("stream1.dry_bulb", T, "24.4 C", "0.2 K"),
                ("stream1.wet_bulb", T, "16.5 C", "0.2 K"),
                ("stream1_flow.rate", Kind::AirFlow, "1890 L/s", "4 %"),
                ("stream2.dry_bulb", T, "33.0 C", "0.2 K"),
                ("stream2.wet_bulb", T, "24.0 C", "0.2 K"),
                ("stream2_flow.rate", Kind::AirFlow, "520 L/s", "5 %"),
            ],
        },
        "condensate" => Example {
            choices: &[("pressure.by", "read"), ("flow.basis", "actual_leaving"), ("fills", "2")],
            readings: &[
                ("pressure.read", Kind::Pressure, "100.8 kPa", "0.2 kPa"),
                ("entering.dry_bulb", T, "26.4 C", "0.1 K"),
                ("entering.wet_bulb", T, "20.1 C", "0.1 K"),
                ("leaving.dry_bulb", T, "12.6 C", "0.1 K"),
                ("leaving.wet_bulb", T, "11.8 C", "0.1 K"),
                ("flow.rate", Kind::AirFlow, "2360 L/s", "4 %"),
                ("fill1.volume", Kind::WaterVolume, "10 L", "0.1 L"),
                ("fill1.time", Kind::Duration, "1200 s", "3 s"),
                ("fill2.volume", Kind::WaterVolume, "10 L", "0.1 L"),
                ("fill2.time", Kind::Duration, "1204 s", "3 s"),
            ],
        },
        "outdoor_share" => Example {
            choices: &[
                ("pressure.by", "elevation"),
                ("return.humidity_by", "relative_humidity"),
                ("outdoor.humidity_by", "relative_humidity"),
                ("mixed.humidity_by", "relative_humidity"),
            ],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "850 m", ""),
                ("return.dry_bulb", T, "23.6 C", "0.3 K of stem"),
                ("return.relative_humidity", Kind::RelativeHumidity, "42 %", "1.5 % of probe"),
                ("outdoor.dry_bulb", T, "6.0 C", "0.3 K of stem"),
                ("outdoor.relative_humidity", Kind::RelativeHumidity, "60 %", "1.5 % of probe"),
                ("mixed.dry_bulb", T, "18.9 C", "0.5 K of stem"),
                ("mixed.relative_humidity", Kind::RelativeHumidity, "43 %", "1.5 % of probe"),
                ("co2.return", Kind::MoleFraction, "965 ppm", "20 ppm of analyser"),
                ("co2.outdoor", Kind::MoleFraction, "428 ppm", "20 ppm of analyser"),
                ("co2.mixed", Kind::MoleFraction, "818 ppm", "20 ppm of analyser"),
            ],
        },
        "coil" => Example {
            choices: &[("pressure.by", "elevation")],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "50 m", ""),
                ("entering.dry_bulb", T, "26.7 C", "0.1 K of dry"),
                ("entering.wet_bulb", T, "20.4 C", "0.1 K of wet"),
                ("leaving.dry_bulb", T, "12.8 C", "0.1 K of dry"),
                ("leaving.wet_bulb", T, "11.9 C", "0.1 K of wet"),
            ],
        },
        "economizer" => Example {
            choices: &[
                ("pressure.by", "elevation"),
                ("return.humidity_by", "relative_humidity"),
                ("outdoor.humidity_by", "relative_humidity"),
                ("flow.basis", "dry_air"),
            ],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "50 m", ""),
                ("return.dry_bulb", T, "24.5 C", "0.3 K of stem"),
                ("return.relative_humidity", Kind::RelativeHumidity, "50 %", "2 % of probe"),
                ("outdoor.dry_bulb", T, "32.0 C", "0.3 K of stem"),
                ("outdoor.relative_humidity", Kind::RelativeHumidity, "55 %", "2 % of probe"),
                ("flow.dry_air", Kind::DryAirFlow, "5 kg/s", "4 %"),
                ("damper.least", Kind::Share, "20 %", "2 %"),
                ("coil.leaving", T, "13.0 C", "0.3 K"),
            ],
        },
        "room_air" => Example {
            choices: &[("exhaust.basis", "actual_room"), ("supply.basis", "actual_room")],
            readings: &[
                ("size.length", Kind::RoomLength, "4.8 m", "0.02 m"),
                ("size.width", Kind::RoomLength, "5.5 m", "0.02 m"),
                ("size.height", Kind::RoomLength, "2.8 m", "0.02 m"),
                ("exhaust.rate", Kind::AirFlow, "210 L/s", "6 L/s of hood"),
                ("supply.rate", Kind::AirFlow, "155 L/s", "5 L/s of hood"),
                ("between.pressure", Kind::PressureDifference, "-2.1 Pa", "0.4 Pa"),
                ("between.zero_before", Kind::PressureDifference, "0.1 Pa", "0.1 Pa"),
                ("between.zero_after", Kind::PressureDifference, "0.3 Pa", "0.1 Pa"),
            ],
        },
        "recovery" => Example {
            choices: &[
                ("pressure.by", "read"),
                ("device.kind", "moist_wheel"),
                ("outdoor.humidity_by", "relative_humidity"),
                ("supply.humidity_by", "relative_humidity"),
                ("return.humidity_by", "relative_humidity"),
                ("supply_flow.basis", "actual_supply"),
                ("return_flow.basis", "actual_return"),
            ],
            readings: &[
                ("pressure.read", Kind::Pressure, "100.8 kPa", "0.2 kPa"),
                ("outdoor.dry_bulb", T, "33.0 C", "0.3 K of stem"),
                ("outdoor.relative_humidity", Kind::RelativeHumidity, "50 %", "1.5 % of probe"),
                ("supply.dry_bulb", T, "26.6 C", "0.3 K of stem"),
                ("supply.relative_humidity", Kind::RelativeHumidity, "52 %", "1.5 % of probe"),
                ("return.dry_bulb", T, "23.5 C", "0.3 K of stem"),
                ("return.relative_humidity", Kind::RelativeHumidity, "45 %", "1.5 % of probe"),
                ("supply_flow.rate", Kind::AirFlow, "1700 L/s", "4 %"),
                ("return_flow.rate", Kind::AirFlow, "1400 L/s", "4 %"),
            ],
        },
        "humidifying" => Example {
            choices: &[
                ("pressure.by", "elevation"),
                ("method.by", "evaporative"),
                ("pad.by", "leaving"),
                ("flow.basis", "actual_entering"),
            ],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "1280 m", ""),
                ("entering.dry_bulb", T, "38.9 C", "0.3 K of dry"),
                ("entering.wet_bulb", T, "17.2 C", "0.3 K"),
                ("pad.leaving_dry_bulb", T, "21.1 C", "0.3 K of dry"),
                ("flow.rate", Kind::AirFlow, "3775 L/s", "5 %"),
            ],
        },
        "heat_rise" => Example {
            choices: &[("pressure.by", "elevation"), ("power.by", "three_phase")],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "1829 m", ""),
                ("entering.dry_bulb", T, "17.5 C", "0.3 K of stem"),
                ("leaving.dry_bulb", T, "31.1 C", "0.3 K of stem"),
                ("power.voltage", Kind::Voltage, "208 V", "2 V"),
                ("power.current", Kind::Current, "41.5 A", "0.8 A"),
                ("power.factor", Kind::Ratio, "97 %", "0.5 %"),
            ],
        },
        "fan_heat" => Example {
            choices: &[
                ("pressure.by", "elevation"),
                ("flow.basis", "actual_entering"),
                ("fan.motor", "in_stream"),
            ],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "100 m", ""),
                ("entering.dry_bulb", T, "13.5 C", "0.3 K"),
                ("entering.wet_bulb", T, "12.6 C", "0.3 K"),
                ("flow.rate", Kind::AirFlow, "4200 L/s", "4 %"),
                ("fan.total_pressure", Kind::PressureDifference, "980 Pa", "30 Pa"),
                ("fan.efficiency", Kind::Share, "62 %", "3 %"),
                ("fan.motor_efficiency", Kind::Share, "91 %", "1 %"),
            ],
        },
        "surface" => Example {
            choices: &[
                ("pressure.by", "elevation"),
                ("air.humidity_by", "relative_humidity"),
                ("surface.by", "read"),
            ],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "5 m", ""),
                ("air.dry_bulb", T, "24.0 C", "0.3 K"),
                ("air.relative_humidity", Kind::RelativeHumidity, "60 %", "2.5 %"),
                ("surface.temperature", T, "13.9 C", "0.5 K"),
            ],
        },
        "traverse" => Example {
            choices: &[
                ("pressure.by", "elevation"),
                ("duct.shape", "rectangular"),
                ("duct.size_is", "clear"),
                ("duct_air.humidity_by", "relative_humidity"),
                ("grid.read_as", "velocity"),
                ("grid.meter", "actual"),
            ],
            readings: &[
                ("pressure.elevation", Kind::Elevation, "640 m", ""),
                ("duct.width", Kind::Length, "600 mm", "3 mm"),
                ("duct.height", Kind::Length, "500 mm", "3 mm"),
                ("duct_air.dry_bulb", T, "14.2 C", "0.4 K"),
                ("duct_air.relative_humidity", Kind::RelativeHumidity, "88 %", "3 %"),
                ("plane.half_width", Kind::Share, "3 %", ""),
                ("line1.point1", Kind::Velocity, "7.8 m/s", "3 % of vane"),
                ("line1.point2", Kind::Velocity, "8.6 m/s", "3 % of vane"),
                ("line1.point3", Kind::Velocity, "8.9 m/s", "3 % of vane"),
                ("line1.point4", Kind::Velocity, "8.5 m/s", "3 % of vane"),
                ("line1.point5", Kind::Velocity, "7.6 m/s", "3 % of vane"),
                ("line2.point1", Kind::Velocity, "8.4 m/s", "3 % of vane"),
                ("line2.point2", Kind::Velocity, "9.3 m/s", "3 % of vane"),
                ("line2.point3", Kind::Velocity, "9.6 m/s", "3 % of vane"),
                ("line2.point4", Kind::Velocity, "9.2 m/s", "3 % of vane"),
                ("line2.point5", Kind::Velocity, "8.1 m/s", "3 % of vane"),
                ("line3.point1", Kind::Velocity, "8.5 m/s", "3 % of vane"),
                ("line3.point2", Kind::Velocity, "9.5 m/s", "3 % of vane"),
                ("line3.point3", Kind::Velocity, "9.8 m/s", "3 % of vane"),
                ("line3.point4", Kind::Velocity, "9.4 m/s", "3 % of vane"),
                ("line3.point5", Kind::Velocity, "8.3 m/s", "3 % of vane"),
                ("line4.point1", Kind::Velocity, "8.2 m/s", "3 % of vane"),
                ("line4.point2", Kind::Velocity, "9.1 m/s", "3 % of vane"),
                ("line4.point3", Kind::Velocity, "9.5 m/s", "3 % of vane"),
                ("line4.point4", Kind::Velocity, "9.0 m/s", "3 % of vane"),
                ("line4.point5", Kind::Velocity, "8.0 m/s", "3 % of vane"),
                ("line5.point1", Kind::Velocity, "7.5 m/s", "3 % of vane"),
                ("line5.point2", Kind::Velocity, "8.4 m/s", "3 % of vane"),
                ("line5.point3", Kind::Velocity, "8.7 m/s", "3 % of vane"),
                ("line5.point4", Kind::Velocity, "8.3 m/s", "3 % of vane"),
                ("line5.point5", Kind::Velocity, "7.4 m/s", "3 % of vane"),
            ],
        },
        "water_heat" => Example {
            choices: &[
                ("water.fluid", "propylene_glycol"),
                ("water.strength_by", "volume"),
                ("power.covers", "with_pumps"),
            ],
            readings: &[
                ("water.rate", Kind::WaterFlow, "6.1 L/s", "3 %"),
                ("water.entering", T, "6.7 C", "0.1 K of stem"),
                ("water.leaving", T, "12.3 C", "0.1 K of stem in 5 takes"),
                ("water.volume_share", Kind::Share, "30 %", "2 %"),
                ("power.input", Kind::Power, "38.5 kW", "2 %"),
            ],
        },
        "coil_balance" => Example {
            choices: &[
                ("pressure.by", "read"),
                ("flow.basis", "actual_leaving"),
                ("water.fluid", "water"),
            ],
            readings: &[
                ("pressure.read", Kind::Pressure, "101.325 kPa", "0.2 kPa"),
                ("entering.dry_bulb", T, "26.7 C", "0.25 K of dry"),
                ("entering.wet_bulb", T, "19.4 C", "0.25 K of wet"),
                ("leaving.dry_bulb", T, "12.8 C", "0.25 K of dry"),
                ("leaving.wet_bulb", T, "12.2 C", "0.25 K of wet in 5 takes"),
                ("flow.rate", Kind::AirFlow, "2000 L/s", "4 %"),
                ("water.rate", Kind::WaterFlow, "2.16 L/s", "3 %"),
                ("water.entering", T, "7.0 C", "0.1 K of stem"),
                ("water.leaving", T, "12.6 C", "0.1 K of stem"),
                ("drain.rate", Kind::CondensateFlow, "21.8 L/h", "3 %"),
                ("drain.temperature", T, "12.8 C", "0.5 K"),
            ],
        },
        "chiller_balance" => Example {
            choices: &[
                ("evaporator.fluid", "water"),
                ("condenser.fluid", "water"),
                ("power.covers", "compressor"),
                ("motor.kind", "open"),
            ],
            readings: &[
                ("evaporator.rate", Kind::WaterFlow, "15.2 L/s", "3 %"),
                ("evaporator.entering", T, "12.1 C", "0.1 K of stem"),
                ("evaporator.leaving", T, "6.6 C", "0.1 K of stem"),
                ("condenser.rate", Kind::WaterFlow, "19.8 L/s", "3 %"),
                ("condenser.entering", T, "29.2 C", "0.1 K of stem"),
                ("condenser.leaving", T, "34.2 C", "0.1 K of stem"),
                ("power.input", Kind::Power, "66 kW", "2 %"),
                ("motor.efficiency", Kind::Share, "93 %", "1 %"),
            ],
        },
        _ => return None,
    })
}

/// The example of a check, read as the app would read it.
pub(crate) fn of(id: &str) -> Option<Given> {
    let example = example(id)?;
    let mut given = Given::default();
    for (key, value) in example.choices {
        given.choose(*key, *value);
    }
    for (key, kind, text, said) in example.readings {
        let (said, takes) = said.split_once(" in ").unwrap_or((said, ""));
        let (plus_minus, probe) = said.split_once(" of ").unwrap_or((said, ""));
        let unit = Unit::of(*kind).next().expect("every kind has a unit");
        let dewledger_quantities::Entry::Read(number) =
            read(*kind, text, unit).unwrap_or_else(|error| panic!("{key}: {error}"))
        else {
            panic!("{key} is blank")
        };
        let half_width_si = match read_plus_minus(*kind, plus_minus, number.unit)
            .unwrap_or_else(|error| panic!("{key}: {error}"))
        {
            None => None,
            Some(PlusMinus::Absolute(width)) => Some(width),
            Some(PlusMinus::Relative(share)) => Some(share * number.amount.si().abs()),
        };
        let reading = Reading { unit: Some(number.unit), half_width_si, amount: number.amount };
        given.put(*key, reading);
        if let Some(half_width) = half_width_si.filter(|_| !probe.is_empty()) {
            given.doubt_by(key, parts(half_width / 1.96, probe, !takes.is_empty()));
        }
    }
    Some(given)
}

/// A probe's statement, four fifths of it calibration, and the scatter of five takes.
fn parts(u: f64, probe: &str, takes: bool) -> Vec<Part> {
    let mut parts = vec![
        Part::certain(Source::Own, u * 0.2_f64.sqrt()),
        Part::certain(Source::shared(probe, probe), u * 0.8_f64.sqrt()),
    ];
    if takes {
        parts.push(Part { source: Source::Scatter, u_si: 0.5 * u, freedom: 4.0 });
    }
    parts
}
